"""Findings of the hand-worked checks, each held by a test: unsafe numbers and bad input."""

from __future__ import annotations

import math

import pytest

import tensionlib as tl
from tensionlib import Across, Hole, Pattern
from tensionlib.errors import InputError, TensionlibError
from tensionlib.steel import shapes
from tensionlib.steel.outline import Properties
from tests.builders import PLATE_STEEL, bolted, gusset, member, tube

LINE = Pattern.lines(3, ["60 mm"], "40 mm", "70 mm")


def pattern(holes=LINE, **changes):
    usual = {
        "to": "long leg",
        "bolts": "M20 8.8/S",
        "threads": "in shear plane",
        "holes": holes,
        "plate": gusset(),
    }
    return tl.BoltedPattern(**usual | changes)


def design(holes=LINE, section="150x100x12 UA", force="200 kN", service=None, across=None, **more):
    tie = member(section, pattern(holes, **more), across=across)
    return tl.design(tie, force, service=service)


# Calc.capacity ---------------------------------------------------------------------------


def test_capacity_of_a_pattern_is_the_members_not_one_bolts():
    """Three bolts of 92.628 kN carry 277.884 kN;"""
    assert design().capacity.internal == pytest.approx(277_884.0)


def test_capacity_with_bending_is_a_force():
    """The limit of a sum of ratios is no force."""
    tie = member("150x100x12 UA", bolted(gauge="60 mm"), across=Across())
    assert tl.design(tie, "100 kN").capacity.internal > 1e5


# One flange for both ---------------------------------------------------------------------


def test_both_flanges_need_bolts_in_both():
    """All bolts in flange 1: flange 2 is not held."""
    holes = Pattern.lines(5, ["37.5 mm"], "40 mm", "80 mm", element="flange 1")
    with pytest.raises(InputError, match="flange 2"):
        design(holes, "310UB40.4", to="both flanges")


# Slip of an elastic group ----------------------------------------------------------------


def test_slip_of_the_most_loaded_bolt():
    """Two bolts at 110 mm, 50 apart, 60.9 off the centroid: each carries 1.32 of the force, 66 kN
    of 50 in service, on 0.7·0.35·145 = 35.5; it slips."""
    holes = Pattern.lines(2, ["110 mm"], "40 mm", "50 mm")
    calc = design(holes, force="60 kN", service="50 kN", share="elastic", bolts="M20 8.8/TF")
    assert not calc["slip in service, most loaded bolt"].passes


# Sag of an angle -------------------------------------------------------------------------


def test_sag_of_an_angle_counts_its_product_of_inertia():
    """Free to move aside: I = I_x - I_xy²/I_y, 1.51 times the sag on I_x."""
    calc = design(across=Across(), service="0.1 kN")
    p = Properties.of(shapes.outline("angle", tl.section("150x100x12 UA").dims).moments())
    w = calc.value("w_g").internal
    due = 5 * w * 4000**4 / (384 * 200e3 * (p.I_x - p.I_xy**2 / p.I_y))
    assert calc.value("Delta_0").internal == pytest.approx(due)


# An inclined member ----------------------------------------------------------------------
def test_an_inclined_member_is_taken_with_its_whole_weight_across_it():
    """5 m: w·5²/8, never less than the w·5·4/8 of a rise over 4 m."""
    tie = member("150x100x12 UA", bolted(gauge="60 mm"), length="5 m", across=Across())
    calc = tl.design(tie, "10 kN")
    w = 1.2 * calc.value("w_g").internal
    assert calc.value("M_star_x").internal == pytest.approx(w * 5000**2 / 8)


# Slender tubes ---------------------------------------------------------------------------


def test_a_slender_tube_is_reduced_or_not_covered():
    """200x200x5 SHS of C350: (200 - 10)/5·√(350/250) = 45.0 > 40 (Table 5.2, from memory)."""
    section = tl.section("200x200x5.0 SHS")
    calc = tl.design(tube("200x200x5.0 SHS").but(across=Across()), "100 kN")
    reduced = calc.value("Z_ex").internal < 0.999 * section.I_x / 100
    assert reduced or any("bending" in line.title for line in calc.not_covered)


# Play of a reamed or diametered hole -----------------------------------------------------


def test_a_hole_reamed_to_an_oversize_has_its_play():
    """28 mm is the oversize hole of M20, whoever made it so."""
    assert design(LINE.reamed("1", "28 mm")).not_covered


def test_slip_in_a_hole_reamed_to_an_oversize():
    calc = design(LINE.reamed("1", "28 mm"), bolts="M20 8.8/TF", service="50 kN")
    assert calc["slip in service"].capacity.internal == pytest.approx(106_575 * 0.85)


# Two cover plates in a pair's gap --------------------------------------------------------


def test_two_covers_do_not_fit_a_pairs_gap():
    """Two plates of 12 mm do not go into a gap of 12."""
    covers = tl.Covers("12 mm", PLATE_STEEL, "150 mm")
    with pytest.raises(InputError):
        design(LINE, "2/150x100x12 UA, long legs, gap 12 mm", plate=covers)


@pytest.mark.parametrize(
    "end",
    [
        lambda plate: bolted(gauge="60 mm", plate=plate),
        lambda plate: tl.Welded("long leg", "6 mm", plate, "150 mm"),
    ],
)
def test_covers_belong_to_a_pattern(end):
    """A regular end takes a gusset."""
    with pytest.raises(InputError):
        tl.design(member("150x100x12 UA", end(tl.Covers("12 mm", PLATE_STEEL, "200 mm"))), "9 kN")


# A stated limit that is not checked ------------------------------------------------------


@pytest.mark.parametrize(
    ("across", "service"),
    [
        (Across(sag_limit="1 mm"), None),
        (Across(stretch_limit="0.01 mm"), None),
    ],
)
def test_a_stated_limit_is_never_dropped(across, service):
    """Without a force in service it is said to be missing."""
    calc = design(across=across, service=service)
    names = {check.name for check in calc} | {line.title for line in calc.not_covered}
    assert any(name.startswith(("sag", "stretch")) for name in names)


# Printed area below nothing --------------------------------------------------------------


def test_a_net_tension_area_is_never_negative():
    """Lines 12 mm apart, 20 mm along: A_nt = (12 - 22 + 20²/48)·12 = -20 mm² counts as nothing."""
    holes = Pattern(
        (
            Hole("1", "40 mm", "60 mm"),
            Hole("2", "60 mm", "72 mm"),
            Hole("3", "160 mm", "60 mm"),
            Hole("4", "180 mm", "72 mm"),
        )
    )
    assert design(holes).value("A_nt").internal >= 0.0


# Fields not checked ----------------------------------------------------------------------


def test_bolt_is_true_or_false():
    """A word is neither."""
    with pytest.raises(InputError, match="bolt: got 'no'; True or False"):
        Hole("1", "40 mm", "60 mm", bolt="no")


def test_element_is_text():
    with pytest.raises(InputError, match="element: got 3"):
        Hole("1", "40 mm", "60 mm", element=3)


@pytest.mark.parametrize(
    "make",
    [
        lambda: Pattern.lines(2, 55, "40 mm", "70 mm"),
        lambda: Pattern.lines(2, ["55 mm"], "40 mm", "70 mm", None),
        lambda: Pattern.lines(2, ["55 mm"], "40 mm", "70 mm", first="a"),
        lambda: Pattern.lines(2, ["55 mm"], "40 mm", "70 mm", first=0.5),
        lambda: Pattern.lines(2, ["55 mm"], "80 mm", "-10 mm"),
        lambda: LINE + 3,
        lambda: LINE.end_cut("-40 mm"),
    ],
)
def test_what_is_no_pattern_is_refused(make):
    """No raw error, and nothing taken that is none."""
    with pytest.raises(TensionlibError):
        make()


# Names of an equal angle's legs ----------------------------------------------------------


@pytest.mark.parametrize(("to", "element"), [("long leg", "leg"), ("leg", "long leg")])
def test_an_equal_angles_leg_has_two_names(to, element):
    """ "leg" and "long leg" are one."""
    holes = Pattern((Hole("1", "40 mm", "50 mm", element), Hole("2", "110 mm", "50 mm", element)))
    assert design(holes, "100x100x10 EA", to=to).value("k_te") == 0.85


# Messages --------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("field", "changes"),
    [
        ("plate_end_distance", {"plate_end_distance": "8 mm"}),
        ("plate_edge_distance", {"plate_edge_distance": "8 mm"}),
        ("plate.width", {"plate": tl.Covers("10 mm", PLATE_STEEL, "20 mm", number=1)}),
    ],
)
def test_a_plate_that_is_too_small_is_named(field, changes):
    """The field and its value."""
    with pytest.raises(InputError, match=field):
        design(LINE, **changes)


# A docstring -----------------------------------------------------------------------------


def test_sag_with_one_term_is_within_what_its_docstring_says():
    """No less than the exact sag, and within 3 % above it."""
    from tensionlib.standards.common_as_nzs import bending

    E_I, L, w, N = 200e3 * 21_600, 4000.0, 0.1386, 300e3
    k = math.sqrt(N / E_I)
    exact = w / (k * k * N) * (1 / math.cosh(k * L / 2) - 1) + w * L**2 / (8 * N)
    alone = bending.sag(w, L, 200e3, 21_600)
    found = bending.sag_under_tension(alone, N, bending.straightening(200e3, 21_600, L))
    assert exact <= found <= 1.03 * exact
