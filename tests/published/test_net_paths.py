"""Staggered holes of published examples, found by the search and written by the clause's formulas.

Sources: McCormac and Csernak, Structural Steel Design, 5th edition, examples 3-2 and 3-3; Segui,
Steel Design, 5th edition, examples 3.6 and 3.7; Trahair, Bradford, Nethercot and Gardner, The
Behaviour and Design of Steel Structures to EC3, 4th edition, example 2.7.1. The holes are placed
from the stated stagger and gauges; the edge distances are not known and do not count in the width.
s²/4g is the same rule in AS 4100 and NZS 3404 9.1.10.

Known from: memory of the sources. Tolerance: as printed, half a unit of the last figure.
"""

from __future__ import annotations

from dataclasses import replace
from typing import ClassVar

import pytest

from tensionlib.joints.parts import Flat, Opening, opened_angle
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


def test_trahair_2_7_1_both_flanges_of_a_column():
    """Four holes of 22 mm across each flange of 25 mm, the outer two 30 mm off the inner two over
    60 mm; A = 20100 mm². The width and the distance between the inner two are not known; there the
    chain is straight, so they do not count."""
    flange = Flat.plain(310.0, 25.0)
    places = ((30.0, 35.0), (0.0, 95.0), (0.0, 215.0), (30.0, 275.0))
    group = [Opening.round(str(k), 60.0 + x, y, 22.0) for k, (x, y) in enumerate(places)]
    path = least_path(flange, group)
    assert len(path.hops) == 4
    assert agrees(sum(22.0 * hop.t - hop.lost for hop in path.hops) / 2, "93.8")
    assert agrees(20100.0 - 2 * by_formulas(path), "16080", figures=4)


class TestSegui37:
    """Segui 3.7: an 8 x 6 x 1/2 angle with staggered bolts in both legs, A_g = 6.80 in², holes of
    1 in. Lines 2 1/4 in and 2 1/2 in on from the heel of the 6 in leg (c, b), 3 in and 3 in on from
    that of the 8 in leg (d, e); b and d stand 1 1/2 in farther in than c and e. Ten bolts; that the
    lines of b and d have three and those of c and e two, 3 in apart, is not known for certain: the
    chains need only the innermost of each line, and the number."""

    A_g = 6.80
    angle = opened_angle(8 * IN, 6 * IN, 0.5 * IN)
    lines: ClassVar = {"b": 7.5 + 4.75, "c": 7.5 + 2.25, "d": 8.0 - 3.0, "e": 8.0 - 6.0}

    def holes(self) -> list[Opening]:
        """All ten, the third of each line the innermost."""
        return [
            Opening.round(
                f"{line}{row}", (2.0 + 3.0 * row - (line in "ce") * 1.5) * IN, y * IN, 1.0 * IN
            )
            for line, y in self.lines.items()
            for row in ((1, 2, 3) if line in "bd" else (2, 3))
        ]

    def net(self, path: NetPath) -> float:
        return self.A_g - by_formulas(path) / IN**2

    def test_round_the_heel(self):
        c, d = (next(h for h in self.holes() if h.mark == mark) for mark in ("c3", "d3"))
        (_, hop) = least_path(self.angle, [c, d]).hops
        assert agrees(hop.g / IN, "4.75")

    def test_through_all_four_lines(self):
        for credit in (False, True):
            path = least_path(
                self.angle, self.holes(), credit_behind=credit, gross=self.A_g * IN**2
            )
            assert "".join(hop.hole.mark[0] for hop in path.hops) == "edcb"
            assert agrees(self.net(path), "5.065")
            assert path.carried == 1.0

    def test_straight_through_b_and_d(self):
        path = least_path(self.angle, [h for h in self.holes() if h.mark in ("b3", "d3")])
        assert agrees(self.net(path), "5.80")

    def test_past_d_a_tenth_of_the_force_is_taken(self):
        """Chain b c e: printed 5.413 in², and 6.014 in² for nine tenths of the force.

        So that it governs, d3 stands far behind it and d1 and d2 take nothing from the section.
        """
        group = [
            replace(hole, x=40.0 * IN)
            if hole.mark == "d3"
            else replace(hole, across=1e-9)
            if hole.mark in ("d1", "d2")
            else hole
            for hole in self.holes()
        ]
        path = least_path(self.angle, group, credit_behind=True, gross=self.A_g * IN**2)
        assert [hop.hole.mark for hop in path.hops] == ["e3", "c3", "b3"]
        assert path.carried == pytest.approx(0.9)
        # Printed 5.413 from 5.4125: a tie, which may have gone either way.
        assert agrees(self.net(path), "5.413")
        assert agrees(self.net(path) / path.carried, "6.014")
