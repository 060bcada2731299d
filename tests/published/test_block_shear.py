"""Block shear of four bolts in a line: the published coefficients of its three terms.

Source: AISC, Steel Construction Manual, 14th and 15th editions, Tables 9-3a, 9-3b and 9-3c, in
kip for an inch of thickness: 3/4 in bolts at 3 in, holes 7/8 in, edges 1 1/2 in, 36 and 58 ksi,
factor 0.75, the factor the library takes.

Known from: memory of the source.

Tolerance: as printed, half a unit of the last of three figures.
"""

from __future__ import annotations

import pytest

from tensionlib.quantities import parse
from tensionlib.standards.as4100.rules import BLOCK
from tensionlib.standards.common_as_nzs import block
from tests.printed import agrees

IN = 25.4
KIP = parse("1 kip").internal
F_Y, F_U = parse("36 ksi").internal, parse("58 ksi").internal
HOLE, BOLTS = 0.875 * IN, 4.0
L_V = block.shear_length(1.5 * IN, BOLTS, 3 * IN)
A_GV = block.gross_shear(1.0, 1.0, L_V, IN)
A_NV = block.net_shear(1.0, 1.0, L_V, BOLTS, HOLE, IN)
A_NT = block.net_tension(1.0, block.width_to_edge(1.5 * IN, HOLE), IN)


def kip(N_bs: float) -> float:
    return block.design_block(BLOCK.phi, N_bs) / KIP


@pytest.mark.parametrize(
    ("N_bs", "published"),
    [
        (block.block_shear(F_U, 0.0, F_Y, A_GV, 1.0, A_NT), "46.2"),
        (block.block_shear(F_U, A_NV, F_Y, A_GV, 0.0, A_NT), "170"),
        # With a yield stress beyond reach the net shear area rules.
        (block.block_shear(F_U, A_NV, 1e6, A_GV, 0.0, A_NT), "194"),
    ],
    ids=["tension", "shear yield", "shear fracture"],
)
def test_term(N_bs, published):
    assert agrees(kip(N_bs), published, figures=3)


def test_whole_block():
    """The tension term and the lesser shear term add: 46.2 and 170, each half a unit wide."""
    whole = kip(block.block_shear(F_U, A_NV, F_Y, A_GV, block.UNIFORM, A_NT))
    assert whole == pytest.approx(46.2 + 170, abs=0.05 + 0.5)
