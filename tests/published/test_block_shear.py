"""Block shear coefficients of four bolts in a line.

Source: AISC Steel Construction Manual, 14th and 15th editions, Tables 9-3a to 9-3c, kip per inch
of thickness, from memory of the source: 3/4 in bolts at 3 in, L_ev = L_eh = 1.5 in, F_y = 36 ksi,
F_u = 58 ksi. The form of the block is the one the library uses as practised. Tolerance: as
printed, three figures.
"""

from __future__ import annotations

from tensionlib.standards.nzs3404 import block
from tests.printed import agrees

INCH = 25.4
KIP = 4448.2216152605
KSI = KIP / INCH**2
HOLE = 0.875 * INCH


def _areas():
    L_v = block.shear_length(1.5 * INCH, 4.0, 3 * INCH)
    A_gv = block.gross_shear(1.0, 1.0, L_v, 1.0)
    A_nv = block.net_shear(1.0, 1.0, L_v, 4.0, HOLE, 1.0)
    A_nt = block.net_tension(1.0, block.width_to_edge(1.5 * INCH, HOLE), 1.0)
    return A_gv, A_nv, A_nt


def test_the_three_terms():
    A_gv, A_nv, A_nt = _areas()
    per_inch = KIP / INCH
    assert agrees(0.75 * 58 * KSI * A_nt / per_inch, "46.2")
    assert agrees(0.75 * 0.6 * 36 * KSI * A_gv / per_inch, "170", units=0.05)
    assert agrees(0.75 * 0.6 * 58 * KSI * A_nv / per_inch, "194")


def test_the_block():
    A_gv, A_nv, A_nt = _areas()
    N_bs = block.block_shear(58 * KSI, A_nv, 36 * KSI, A_gv, 1.0, A_nt)
    assert agrees(block.PHI * N_bs / (KIP / INCH), "216.3", units=1.0)  # 46.2 + 170.1
