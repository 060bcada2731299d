"""Sections opened flat: where a hole of each element lies, and where it cannot."""

from __future__ import annotations

import math
from typing import Any

import pytest

import tensionlib as tl
from tensionlib import Hole, Pattern
from tensionlib.errors import InputError
from tensionlib.joints.opened import element_part, opened
from tensionlib.steel import Section
from tests.builders import PLATE_STEEL, TUBE_STEEL, gusset, member

UA = "150x100x12 UA"


def section(name: str) -> Section:
    return tl.section(name)


def place(name: str, element: str, y: float) -> float:
    return opened(section(name)).sheet(element).across(element, y)


# Where holes lie --------------------------------------------------------------------------


def test_two_lines_of_an_angle_are_their_gauges_less_its_thickness_apart():
    """55 + 45 - 12 = 88."""
    assert place(UA, "long leg", 55.0) == 150.0 - 55.0
    assert place(UA, "short leg", 45.0) - place(UA, "long leg", 55.0) == pytest.approx(88.0)


def test_an_equal_angle_has_a_leg_and_another():
    assert opened(section("100x100x10 EA")).elements == ("leg", "other leg")


def test_a_channel_measures_round_its_corners():
    """200 PFC, flanges 12 and web 6: 45 + 60 - 3 - 6 = 96 from a flange's line to the web's, and
    the far flange's line 200 - 60 off the web's other end: 45 + 140 - 9 = 176."""
    web = place("200 PFC", "web", 60.0)
    assert web - place("200 PFC", "flange 1", 45.0) == pytest.approx(96.0)
    assert place("200 PFC", "flange 2", 45.0) - web == pytest.approx(176.0)


def test_a_line_in_the_toe_of_the_flange_is_at_the_edge_of_the_sheet():
    sheet = opened(section("200 PFC")).sheet("web")
    assert sheet.across("flange 1", 75.0) == pytest.approx(0.0)
    assert sheet.across("flange 2", 75.0) == pytest.approx(sheet.part.width)


def test_an_i_is_three_sheets_and_a_pair_two_components():
    shape = opened(section("310UB40.4"))
    assert [sheet.title for sheet in shape.sheets] == ["flange 1", "web", "flange 2"]
    assert shape.components == 1
    pair = opened(section("2/150x100x12 UA, long legs, gap 12 mm"))
    assert (len(pair.sheets), pair.components) == (1, 2)


def test_an_element_the_section_has_not_is_refused():
    with pytest.raises(InputError, match="element: got 'web'; this section has 'long leg', 'short"):
        opened(section(UA)).sheet("web")


@pytest.mark.parametrize(("name", "shape"), [("114.3x4.8 CHS", "CHS"), ("100x100x5.0 SHS", "RHS")])
def test_tubes_take_no_holes(name, shape):
    with pytest.raises(InputError, match=rf"holes: .*\({shape}\) takes no holes in this library"):
        opened(section(name))


# Edges of an element ----------------------------------------------------------------------

FREE = [
    # Low edge free, high edge free, thickness.
    (UA, "long leg", False, True, 12.0),
    (UA, "short leg", False, True, 12.0),
    ("100x100x10 EA", "other leg", False, True, 9.5),
    ("200 PFC", "web", False, False, 6.0),
    ("200 PFC", "flange 2", False, True, 12.0),
    ("310UB40.4", "flange 1", True, True, 10.2),
    ("310UB40.4", "web", False, False, 6.1),
    ("150x12 FL", "plate", True, True, 12.0),
]


@pytest.mark.parametrize(("name", "element", "low", "high", "t"), FREE)
def test_which_edges_a_block_may_tear_to(name, element, low, high, t):
    part = element_part(section(name), element)
    middle = part.width / 2
    assert math.isfinite(part.to_low(40.0, middle)) is low
    assert math.isfinite(part.to_high(40.0, middle)) is high
    assert part.thickness(middle) == t


def test_a_tee_has_a_free_tip_and_a_web_on_its_flange():
    """y of the stem runs from its tip to the outer face of the flange."""
    tee = tl.by_dimensions("tee", d="150 mm", b_f="165 mm", t_f="10 mm", t_w="6 mm", r1="0 mm")
    stem, flange = element_part(tee, "web"), element_part(tee, "flange")
    assert (stem.width, stem.to_low(40.0, 60.0), stem.to_high(40.0, 60.0)) == (
        150.0,
        60.0,
        math.inf,
    )
    assert (flange.to_low(40.0, 60.0), flange.to_high(40.0, 60.0)) == (60.0, 105.0)
    assert flange.thickness_between(60.0, 105.0) > 1e5
    assert opened(tee).elements == ("flange", "web")


def test_a_web_stands_on_the_flange_of_an_i():
    part = element_part(section("310UB40.4"), "flange 1")
    assert part.thickness_between(37.5, 127.5) > 1e5
    assert part.thickness_between(0.0, 37.5) == 10.2


# Refusals of an end -----------------------------------------------------------------------


def design(section: str, *holes: Hole, member_changes: Any = None, **changes: Any) -> Any:
    usual = {
        "to": "long leg",
        "bolts": "M20 8.8/S",
        "threads": "in shear plane",
        "holes": Pattern(holes),
        "plate": gusset(),
    }
    end = tl.BoltedPattern(**usual | changes)
    return tl.design(member(section, end, **(member_changes or {})), "100 kN")


def at(x: float, y: float, element: str = "", mark: str = "1", **more: Any) -> Hole:
    return Hole(mark, f"{x} mm", f"{y} mm", element, **more)


NO_PLACE = [
    (
        lambda: design(UA, at(40, 60), at(40, 60, "web", "2")),
        "hole 2: element 'web'; 150x100x12 UA has 'long leg', 'short leg'",
    ),
    # A hole of 22 on the leg's own 12: more than 23 from the heel.
    (lambda: design(UA, at(40, 23)), "hole '1' in the long leg, 23 mm across: .*other leg, 12 mm"),
    (
        lambda: design(UA, at(40, 60), at(110, 20, "short leg", "2")),
        "hole '2' in the short leg, 20 mm across: it runs into the other leg, 12 mm thick",
    ),
    (
        lambda: design("200 PFC", at(40, 100), at(110, 17, "flange 1", "2"), to="web"),
        "hole '2' in the flange 1, 17 mm across: it runs into the web, 6 mm thick",
    ),
    (lambda: design("200 PFC", at(40, 23), to="web"), "in the web, 23 mm .*a flange, 12 mm thick"),
    (lambda: design("200 PFC", at(40, 177), to="web"), "in the web, 177 mm .*a flange, 12 mm"),
    (
        lambda: design(
            "310UB40.4", at(40, 90, "flange 1"), at(40, 37.5, "flange 2", "2"), to="both flanges"
        ),
        "hole '1' in the flange 1, 90 mm across: it runs into the web, 6.1 mm thick",
    ),
    (lambda: design(UA, at(40, 140)), r"hole '1' at \(40, 10\) mm: it cuts an edge"),
    (lambda: design(UA, at(40, 60), at(55, 70, mark="2")), "holes '1' and '2' overlap"),
    (
        lambda: design(UA, at(40, 60, diameter="20 mm")),
        "hole 1: diameter 20 mm; more than the bolt's 20 mm is due",
    ),
    (
        lambda: design("114.3x4.8 CHS", at(40, 60), to="web", member_changes={"steel": TUBE_STEEL}),
        "to: 114.3x4.8 CHS .CHS. cannot be bolted in this library",
    ),
    (
        lambda: design(
            "310UB40.4", at(40, 60), to="web", plate=tl.Gusset("12 mm", PLATE_STEEL, "20 mm")
        ),
        "plate.width: got 20 mm; more than 22 mm, from the outer edges of the holes, is due",
    ),
    (
        lambda: design(UA, at(40, 60), share="elastic"),
        "bolt '1' at y = 60 mm: one bolt carries no moment .*give two bolts or more",
    ),
    (
        lambda: design(UA, at(40, 60), at(40, 60, "short leg", "2"), share="elastic"),
        "share: 'elastic' is offered for bolts through one element; give share='equal'",
    ),
    (
        lambda: design(
            "310UB40.4",
            at(40, 37.5, "flange 1"),
            at(40, 37.5, "flange 2", "2"),
            to="both flanges",
            credit_behind=True,
        ),
        "credit_behind: offered where all holes lie in one sheet.*310 UB 40.4 has holes in 2",
    ),
    (
        lambda: design(UA, at(40, 60, "short leg")),
        "holes: no bolt goes through the long leg, which is on the gusset",
    ),
    (lambda: design(UA, at(40, 60), to="web"), "to: got 'web'; .*'long leg', 'short leg'"),
    (lambda: design(UA, at(40, 60), to="heel"), "to: got 'heel'; one of 'long leg'"),
    (lambda: design(UA, at(40, 60), threads="no"), "threads: got 'no'; one of 'in shear plane'"),
    (lambda: design(UA, at(40, 60), edge_kind="cut"), "edge_kind: got 'cut'; one of 'sheared'"),
    (lambda: design(UA, at(40, 60), share="half"), "share: got 'half'; one of 'equal', 'elastic'"),
    (
        lambda: design(UA, at(40, 60), block_tension="?"),
        "block_tension: .*'uniform', 'non-uniform'",
    ),
    (lambda: design(UA, at(40, 60), bolts=20), "bolts: got 20; name them, .*'M20 8.8/S'"),
    (lambda: design(UA, at(40, 60), plate="12 mm"), "plate: got '12 mm'; a Gusset is due"),
    (lambda: design(UA, at(40, 60), credit_behind=1), "credit_behind: got 1; True or False is due"),
    (lambda: design(UA, at(40, 60), holes=[at(40, 60)]), r"holes: got \[.*a Pattern is due"),
    (lambda: design(UA, at(40, 60), k_te=0.9), "k_te_reason: missing"),
    (lambda: design(UA, at(40, 60), k_te=1.2), "k_te: got 1.2"),
    (lambda: design(UA, at(40, 60), slip_factor=0), "slip_factor: got 0"),
    (lambda: tl.Covers("10 mm", PLATE_STEEL), "width: missing; a cover plate needs it, .*'150 mm'"),
    (lambda: tl.Covers("10 mm", PLATE_STEEL, "150 mm", number=3), "number: got 3; 1 or 2 cover"),
    (lambda: tl.Covers("10 mm", PLATE_STEEL, "150 mm", number=0), "number: got 0; .*at least 1"),
]


@pytest.mark.parametrize(("make", "message"), NO_PLACE)
def test_what_is_refused(make, message):
    with pytest.raises(InputError, match=message):
        make()


def test_a_regular_end_on_both_flanges_is_stated_by_points():
    end = tl.Bolted(
        "both flanges",
        "M20 8.8/S",
        "in shear plane",
        2,
        gusset(),
        "40 mm",
        lines=2,
        pitch="70 mm",
        line_spacing="90 mm",
    )
    with pytest.raises(InputError, match="to: the holes of an end on both flanges are stated one"):
        tl.as_pattern(end, section("310UB40.4"))


@pytest.mark.parametrize("name", ["leg", "long leg"])
def test_either_name_of_an_equal_angles_leg_is_taken(name):
    holes = at(40, 55), at(110, 55, mark="2")
    assert design("100x100x10 EA", *holes, to=name).value("k_te") == 0.85
