"""Worked examples of textbooks whose rule is common to the standards.

The deduction of holes along a zigzag, s²t/(4g) a step, gross yielding A_g f_y, the length over the
radius of gyration, the throat of a fillet weld and the areas of a tear-out block do not depend on
the standard. The published hole, factor and strength go in: allowances for holes differ.

Sources, each known from memory of the source:

- AISC, Design Examples, companion to the Steel Construction Manual, V14: D.1, D.2, D.3, D.6.
- AISC, Steel Construction Manual, 14th and 15th editions: Part 8 and Tables 9-3a, 9-3b, 9-3c.
- McCormac and Csernak, Structural Steel Design, 5th edition (2012): examples 3-1, 3-2, 3-3, 3-6.
- Segui, Steel Design, 5th edition (2013): examples 3.1 and 3.6.
- Trahair, Bradford, Nethercot and Gardner, The Behaviour and Design of Steel Structures to EC3,
  4th edition: example 2.7.1.

Tolerance: as printed, half a unit of the last figure; where the source carries a rounded value on,
that value goes in.
"""

from __future__ import annotations

import pytest

from tensionlib.quantities import parse
from tensionlib.standards.nzs3404 import block, gusset, tension, welds
from tests.printed import agrees


def given(text: str) -> float:
    """The internal value of a figure with its unit."""
    return parse(text).internal


def counted(value: float, unit: str) -> float:
    """An internal value counted in a unit."""
    return value / given(f"1 {unit}")


IN = given("1 in")


# Net areas along a straight line ----------------------------------------------------------


@pytest.mark.parametrize(
    ("source", "A_g", "holes", "d_h", "t", "A_n"),
    [
        ("McCormac and Csernak 3-1", "3 in2", 2, 0.875, 0.375, "2.34"),
        ("McCormac and Csernak 3-6", "13.3 in2", 4, 0.875, 0.62, "11.13"),
        ("Segui 3.1", "2.5 in2", 2, 0.75, 0.5, "1.75"),
        ("AISC Design Examples D.1", "6.16 in2", 4, 0.875, 0.4, "4.76"),
        ("AISC Design Examples D.2", "3.75 in2", 1, 0.875, 0.5, "3.31"),
        ("AISC Design Examples D.6", "7.50 in2", 2, 0.875, 0.5, "6.63"),
    ],
)
def test_net_area(source, A_g, holes, d_h, t, A_n):
    A_d = tension.deduction_straight(1.0, float(holes), d_h * IN, t * IN)
    assert agrees(counted(tension.net_area(given(A_g), A_d), "in2"), A_n)


# Zigzags ----------------------------------------------------------------------------------


def test_mccormac_3_2_three_ways_across_a_plate():
    """Plate 11 in by 1/2 in, holes 7/8 in, stagger 3 in, gauges 3 in and 6 in."""
    d_h, t, s = 0.875 * IN, 0.5 * IN, 3 * IN
    plate = 11 * IN * t

    def width(A_d):
        return counted(tension.net_area(plate, A_d), "in2") / 0.5

    straight = tension.deduction_straight(1.0, 2.0, d_h, t)
    zigzag = tension.deduction_zigzag(1.0, d_h, t, s, 3 * IN)
    three = zigzag + tension.deduction_one_hole(1.0, d_h, t)
    wide = tension.deduction_zigzag(1.0, d_h, t, s, 6 * IN)
    assert agrees(width(straight), "9.25")
    assert agrees(width(three), "9.125")
    assert agrees(width(wide), "9.625")
    ruling = max(straight, three, wide)
    assert ruling == three
    assert agrees(counted(tension.net_area(plate, ruling), "in2"), "4.56")


def test_mccormac_3_3_the_pitch_at_which_the_zigzag_costs_one_hole():
    """Plate 6 in wide, holes 7/8 in, gauge 2 in: the published pitch is 2.65 in."""
    one = tension.deduction_one_hole(1.0, 0.875 * IN, IN)
    assert agrees(6 - counted(one, "in2"), "5.125")

    def zigzag(s):
        return tension.deduction_zigzag(1.0, 0.875 * IN, IN, s * IN, 2 * IN)

    assert zigzag(2.645) > one > zigzag(2.655)


def test_segui_3_6_across_three_lines():
    """Plate 16 in by 3/4 in, holes 1 1/8 in, stagger 3 in, gauge 5 in, the middle hole shared."""
    d_h, t = 1.125 * IN, 0.75 * IN
    straight = tension.deduction_straight(1.0, 2.0, d_h, t)
    step = tension.deduction_zigzag(1.0, d_h, t, 3 * IN, 5 * IN)
    through = 2 * step - tension.deduction_one_hole(1.0, d_h, t)
    plate = 16 * IN * t
    assert agrees(counted(tension.net_area(plate, straight), "in2") / 0.75, "13.75")
    net = counted(tension.net_area(plate, max(straight, through)), "in2")
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


# Yielding and slenderness -----------------------------------------------------------------


@pytest.mark.parametrize(
    ("source", "A_g", "f_y", "N_ty", "phiN_ty"),
    [
        ("Segui 3.1", "2.5 in2", "36 ksi", "90", "81.0"),
        ("McCormac and Csernak 3-6", "13.3 in2", "50 ksi", "665", "598.5"),
        ("AISC Design Examples D.1", "6.16 in2", "50 ksi", "308", "277"),
        ("AISC Design Examples D.2", "3.75 in2", "36 ksi", "135", "122"),
        ("AISC Design Examples D.3", "5.84 in2", "50 ksi", "292", "263"),
        ("AISC Design Examples D.6", "7.50 in2", "36 ksi", "270", "243"),
    ],
)
def test_gross_yielding(source, A_g, f_y, N_ty, phiN_ty):
    """D.1 prints the factored value alone; 308 is its A_g F_y."""
    nominal = tension.gross_yielding(given(A_g), given(f_y))
    assert agrees(counted(nominal, "kip"), N_ty)
    assert agrees(counted(tension.design_gross_yielding(0.9, nominal), "kip"), phiN_ty)


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


# Weld and block ---------------------------------------------------------------------------


def test_fillet_weld_a_sixteenth_of_an_inch():
    """Manual Part 8: 1.392 kip/in for each sixteenth of leg, electrode 70 ksi, factor 0.75."""
    v_w = welds.fillet(given("70 ksi"), welds.throat(IN / 16), 1.0)
    assert agrees(counted(welds.design_fillet(0.75, v_w, IN), "kip"), "1.392")


def test_block_shear_terms_per_inch_of_thickness():
    """Manual Tables 9-3: four 3/4 in bolts at 3 in, edges 1 1/2 in, holes 7/8 in, 36/58 ksi."""
    d_h, n_p = 0.875 * IN, 4.0
    f_y, f_u = given("36 ksi"), given("58 ksi")
    L_v = block.shear_length(1.5 * IN, n_p, 3 * IN)
    A_nt = block.net_tension(1.0, block.width_to_edge(1.5 * IN, d_h), IN)
    A_gv = block.gross_shear(1.0, 1.0, L_v, IN)
    A_nv = block.net_shear(1.0, 1.0, L_v, n_p, d_h, IN)

    def kip(N_bs):
        return counted(block.design_block(0.75, N_bs), "kip")

    tension_alone = block.block_shear(f_u, 0.0, f_y, A_gv, 1.0, A_nt)
    yielding = block.block_shear(f_u, A_nv, f_y, A_gv, 0.0, A_nt)
    fracture = block.block_shear(f_u, A_nv, 1e9, A_gv, 0.0, A_nt)
    assert agrees(kip(tension_alone), "46.2")
    assert agrees(kip(yielding), "170")
    assert agrees(kip(fracture), "194")
    both = block.block_shear(f_u, A_nv, f_y, A_gv, 1.0, A_nt)
    assert kip(both) == pytest.approx(46.2 + 170, abs=0.55)


def test_the_flat_of_mccormac_3_1_has_the_same_gross_area_as_a_gusset():
    """Plate 8 in by 3/8 in with two holes, as a gusset: 2.34 in² net."""
    A_np = gusset.net_area(1.0, 8 * IN, 2.0, 0.875 * IN, 0.375 * IN)
    assert agrees(counted(A_np, "in2"), "2.34")
