"""Staggered holes of published examples, found by the search and written by the clause's formulas.

Sources: McCormac and Csernak, Structural Steel Design, 5th edition, examples 3-2 and 3-3; Segui,
Steel Design, 5th edition, example 3.6. The holes are placed from the stated stagger and gauges; the
edge distances are not known and do not count in the width. s²/4g is the same rule in AS 4100 and
NZS 3404 9.1.10.

Known from: memory of the sources. Tolerance: as printed, half a unit of the last figure.
"""

from __future__ import annotations

import pytest

from tensionlib.joints.parts import Flat, Opening
from tensionlib.joints.paths import NetPath, least_path
from tensionlib.standards.common_as_nzs import pattern
from tests.printed import agrees

IN = 25.4


def holes(d: float, *places: tuple[float, float]) -> list[Opening]:
    return [
        Opening.round(str(k), (10.0 + x) * IN, y * IN, d * IN)
        for k, (x, y) in enumerate(places, start=1)
    ]


def by_formulas(path: NetPath) -> float:
    """The area lost, hole by hole, as a calculation writes it."""
    lost = None
    for hop in path.hops:
        d_h = hop.hole.across
        if lost is None:
            lost = pattern.first_hole(d_h, hop.t)
        elif hop.s:
            lost = pattern.next_hole_staggered(lost, d_h, hop.t, hop.s, hop.g, hop.t_step)
        else:
            lost = pattern.next_hole(lost, d_h, hop.t)
    assert lost is not None
    return lost


def test_mccormac_3_2_the_chain_of_three_holes():
    """11 in plate 1/2 in thick; B and C side by side 3 in apart, E 3 in on and 3 in beside C."""
    plate = Flat.plain(11 * IN, 0.5 * IN)
    B, C, E = holes(0.875, (0, 2.5), (0, 5.5), (3, 8.5))
    widths = {
        "9.25": (B, C),
        "9.125": (B, C, E),
        "9.625": (B, E),
    }
    for printed, group in widths.items():
        path = least_path(plate, group)
        assert [hop.hole for hop in path.hops] == list(group)
        assert agrees(11 - by_formulas(path) / (0.5 * IN * IN), printed)
    path = least_path(plate, [E, B, C])
    assert path.lost == pytest.approx(by_formulas(path))
    assert agrees(plate.width / IN * 0.5 - path.lost / IN**2, "4.56")


def test_mccormac_3_3_the_pitch_at_which_the_zigzag_is_one_hole():
    """6 in plate, two lines 2 in apart, holes of 7/8 in: printed pitch 2.65 in."""
    plate = Flat.plain(6 * IN, IN)
    low, high = 1.0, 5.0
    for _ in range(60):
        s = (low + high) / 2
        zigzag = len(least_path(plate, holes(0.875, (0, 2), (s, 4))).hops) == 2
        low, high = (s, high) if zigzag else (low, s)
    assert agrees(low, "2.65")
    assert agrees(6 - least_path(plate, holes(0.875, (0, 2), (3.0, 4))).lost / IN**2, "5.125")


def test_segui_3_6_three_lines():
    """16 in plate 3/4 in thick, lines 5 in apart, stagger 3 in: 13.52 in by all three holes."""
    plate = Flat.plain(16 * IN, 0.75 * IN)
    b, c, d = holes(1.125, (0, 3), (3, 8), (0, 13))
    path = least_path(plate, [b, c, d])
    assert len(path.hops) == 3
    # Printed 13.52 from 13.525: a tie, which may have gone either way.
    assert agrees(16 - by_formulas(path) / (0.75 * IN * IN), "13.52")
    straight = least_path(plate, [b, d])
    assert agrees(16 - by_formulas(straight) / (0.75 * IN * IN), "13.75")
    assert agrees(12.0 - path.lost / IN**2, "10.1")
