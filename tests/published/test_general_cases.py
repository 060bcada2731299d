"""Worked examples of textbooks whose rule is common to the standards.

A net area along a straight line, gross yielding A_g f_y, the length over the radius of gyration
and the throat of a fillet weld do not depend on the standard. The published hole, factor and
strength go in: allowances for holes differ.

Sources, each known from memory of the source:

- AISC, Design Examples, companion to the Steel Construction Manual, V14: D.1, D.2, D.3, D.6.
- AISC, Steel Construction Manual, 14th and 15th editions, Part 8.
- McCormac and Csernak, Structural Steel Design, 5th edition (2012), example 3-6.
- Segui, Steel Design, 5th edition (2013), example 3.1.

Tolerance: as printed, half a unit of the last figure.
"""

from __future__ import annotations

import pytest

from tensionlib.quantities import parse
from tensionlib.standards.common_as_nzs import tension, welds
from tests.printed import agrees


def given(text: str) -> float:
    """The internal value of a figure with its unit."""
    return parse(text).internal


def counted(value: float, unit: str) -> float:
    """An internal value counted in a unit."""
    return value / given(f"1 {unit}")


@pytest.mark.parametrize(
    ("source", "A_g", "holes", "d_h", "t", "A_n"),
    [
        ("McCormac and Csernak 3-6", "13.3 in2", 4, "0.875 in", "0.62 in", "11.13"),
        ("AISC Design Examples D.1", "6.16 in2", 4, "0.875 in", "0.4 in", "4.76"),
        ("AISC Design Examples D.2", "3.75 in2", 1, "0.875 in", "0.5 in", "3.31"),
        ("AISC Design Examples D.6", "7.50 in2", 2, "0.875 in", "0.5 in", "6.63"),
    ],
)
def test_net_area(source, A_g, holes, d_h, t, A_n):
    A_d = tension.deduction_straight(1.0, float(holes), given(d_h), given(t))
    assert agrees(counted(tension.net_area(given(A_g), A_d), "in2"), A_n)


@pytest.mark.parametrize(
    ("source", "A_g", "f_y", "nominal", "design"),
    [
        ("Segui 3.1", "2.5 in2", "36 ksi", "90", "81.0"),
        ("McCormac and Csernak 3-6", "13.3 in2", "50 ksi", "665", "598.5"),
        ("AISC Design Examples D.1", "6.16 in2", "50 ksi", None, "277"),
        ("AISC Design Examples D.2", "3.75 in2", "36 ksi", "135", "122"),
        ("AISC Design Examples D.3", "5.84 in2", "50 ksi", "292", "263"),
        ("AISC Design Examples D.6", "7.50 in2", "36 ksi", "270", "243"),
    ],
)
def test_gross_yielding(source, A_g, f_y, nominal, design):
    N_ty = tension.gross_yielding(given(A_g), given(f_y))
    if nominal is not None:
        assert agrees(counted(N_ty, "kip"), nominal, figures=3)
    assert agrees(counted(tension.design_gross_yielding(0.9, N_ty), "kip"), design)


@pytest.mark.parametrize(
    ("source", "L", "r", "published"),
    [
        ("AISC Design Examples D.1", "25 ft", "1.26 in", "238"),
        ("AISC Design Examples D.3", "30 ft", "1.57 in", "229"),
        ("AISC Design Examples D.6", "25 ft", "1.21 in", "248"),
    ],
)
def test_slenderness(source, L, r, published):
    assert agrees(tension.slenderness(given(L), given(r)), published)


def test_fillet_weld_a_sixteenth_of_an_inch():
    """Manual Part 8: 1.392 kip/in for each sixteenth of leg, electrode 70 ksi, factor 0.75."""
    inch = given("1 in")
    v_w = welds.fillet(given("70 ksi"), welds.throat(inch / 16), 1.0)
    assert agrees(counted(welds.design_fillet(0.75, v_w, inch), "kip"), "1.392")
