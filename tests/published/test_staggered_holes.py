"""Worked examples of plates and flanges with straight and staggered holes.

The deduction along a zigzag, s²t/(4g) a step, is common to the standards; allowances for holes
differ, so the published hole goes in.

Sources, each known from memory of the source:

- McCormac and Csernak, Structural Steel Design, 5th edition (2012), examples 3-1, 3-2 and 3-3.
- Segui, Steel Design, 5th edition (2013), examples 3.1 and 3.6.
- Trahair, Bradford, Nethercot and Gardner, The Behaviour and Design of Steel Structures to EC3,
  4th edition, example 2.7.1.

Tolerance: as printed, half a unit of the last figure.
"""

from __future__ import annotations

import pytest

from tensionlib.standards.common_as_nzs import gusset, tension
from tests.printed import agrees

IN = 25.4


def square_inches(area: float) -> float:
    return area / IN**2


@pytest.mark.parametrize(
    ("source", "width", "thickness", "hole", "A_n"),
    [
        ("McCormac and Csernak 3-1", 8.0, 0.375, 0.875, "2.34"),
        ("Segui 3.1", 5.0, 0.5, 0.75, "1.75"),
    ],
)
def test_two_holes_in_line(source, width, thickness, hole, A_n):
    b, t, d_h = width * IN, thickness * IN, hole * IN
    as_member = tension.net_area(b * t, tension.deduction_straight(1.0, 2.0, d_h, t))
    as_gusset = gusset.net_area(1.0, b, 2.0, d_h, t)
    assert agrees(square_inches(as_member), A_n)
    assert agrees(square_inches(as_gusset), A_n)


def test_mccormac_3_2_three_ways_across_a_plate():
    """Plate 11 in by 1/2 in, holes 7/8 in, stagger 3 in, gauges 3 in and 6 in."""
    d_h, t, s = 0.875 * IN, 0.5 * IN, 3 * IN
    plate = 11 * IN * t
    straight = tension.deduction_straight(1.0, 2.0, d_h, t)
    zigzag = tension.deduction_zigzag(1.0, d_h, t, s, 3 * IN)
    three = zigzag + tension.deduction_one_hole(1.0, d_h, t)
    wide = tension.deduction_zigzag(1.0, d_h, t, s, 6 * IN)
    for A_d, width in ((straight, "9.25"), (three, "9.125"), (wide, "9.625")):
        assert agrees(square_inches(tension.net_area(plate, A_d)) / 0.5, width)
    ruling = max(straight, three, wide)
    assert ruling == three
    assert agrees(square_inches(tension.net_area(plate, ruling)), "4.56")


def test_mccormac_3_3_the_pitch_at_which_the_zigzag_costs_one_hole():
    """Plate 6 in wide, holes 7/8 in, gauge 2 in: the published pitch is 2.65 in."""
    one = tension.deduction_one_hole(1.0, 0.875 * IN, IN)
    assert agrees(6 - square_inches(one), "5.125")

    def zigzag(s: float) -> float:
        return tension.deduction_zigzag(1.0, 0.875 * IN, IN, s * IN, 2 * IN)

    assert zigzag(2.645) > one > zigzag(2.655)


def test_segui_3_6_across_three_lines():
    """Plate 16 in by 3/4 in, holes 1 1/8 in, stagger 3 in, gauge 5 in, the middle hole shared."""
    d_h, t = 1.125 * IN, 0.75 * IN
    straight = tension.deduction_straight(1.0, 2.0, d_h, t)
    step = tension.deduction_zigzag(1.0, d_h, t, 3 * IN, 5 * IN)
    through = 2 * step - tension.deduction_one_hole(1.0, d_h, t)
    plate = 16 * IN * t
    assert agrees(square_inches(tension.net_area(plate, straight)) / 0.75, "13.75")
    net = square_inches(tension.net_area(plate, max(straight, through)))
    assert agrees(net / 0.75, "13.52")
    assert agrees(net, "10.1")


def test_trahair_2_7_1_both_flanges_of_a_column():
    """Eight holes of 22 mm through flanges of 25 mm, four steps of 30 mm over 60 mm."""
    d_h, t, s, p = 22.0, 25.0, 30.0, 60.0
    step = 2 * d_h * t - tension.deduction_zigzag(1.0, d_h, t, s, p)
    assert agrees(step, "93.8")
    A_n = tension.net_area(20100.0, tension.deduction_zigzag(4.0, d_h, t, s, p))
    assert agrees(A_n, "16080", figures=4)
    assert agrees(tension.gross_yielding(20100.0, 345.0) / 1e3, "6935")
