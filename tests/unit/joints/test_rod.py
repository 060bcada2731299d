"""Threaded: what passes its door, and what it says to what does not."""

from __future__ import annotations

import pytest

import tensionlib as tl
from tensionlib.errors import InputError, UnitError
from tensionlib.joints.pattern_end import Covers
from tests.builders import PLATE_STEEL, SECTION_STEEL, gusset, member

OUTLINE = tl.GussetShape(
    [("0 mm", "0 mm"), ("300 mm", "0 mm"), ("300 mm", "160 mm"), ("0 mm", "160 mm")],
    [3],
    ("100 mm", "80 mm"),
    "0 deg",
)


def lug(**changes):
    return gusset(**{"thickness": "16 mm", "width": "100 mm"} | changes)


def threaded(**changes):
    usual = {
        "thread": "M24",
        "fork_capacity": "130 kN",
        "certified_by": "test certificate 7",
        "pin": "24 mm",
        "hole": "26 mm",
        "plate": lug(),
        "plate_edge_beyond": "50 mm",
    }
    return tl.Threaded(**usual | changes)


SLEEVE = {
    "coupling": "sleeve",
    "sleeve_diameter": "45 mm",
    "sleeve_steel": SECTION_STEEL,
    "engagement": "30 mm",
}


def test_every_dimension_becomes_a_quantity():
    end = threaded(**SLEEVE)
    found = {
        name: getattr(end, name).internal
        for name in (
            "fork_capacity",
            "pin",
            "hole",
            "plate_edge_beyond",
            "sleeve_diameter",
            "engagement",
        )
    }
    assert found == {
        "fork_capacity": 130e3,
        "pin": 24.0,
        "hole": 26.0,
        "plate_edge_beyond": 50.0,
        "sleeve_diameter": 45.0,
        "engagement": 30.0,
    }
    assert (end.kind, end.to, end.bracing) == ("rod", "rod", True)


@pytest.mark.parametrize(
    ("changes", "error", "says"),
    [
        ({"thread": "M25"}, InputError, "thread: got 'M25'; one of 'M12'"),
        ({"thread": 24}, InputError, "thread: got 24"),
        ({"coupling": "turnbuckles"}, InputError, "coupling: got 'turnbuckles'"),
        ({"to": "bar"}, InputError, "to: got 'bar'; one of 'rod' is due"),
        ({"fork_capacity": 130}, UnitError, "fork_capacity: got 130, a bare number"),
        ({"fork_capacity": "0 kN"}, InputError, "fork_capacity: got 0 kN; it must be above"),
        ({"certified_by": " "}, InputError, "certified_by: missing"),
        ({"certified_by": None}, InputError, "certified_by: missing"),
        ({"hole": "23 mm"}, InputError, "hole: got 23 mm; no less than the pin's 24 mm is due"),
        ({"pin": None}, UnitError, "pin: got nothing"),
        (
            {"plate_edge_beyond": "13 mm"},
            InputError,
            "plate_edge_beyond: got 13 mm; the hole would cut the edge, more than 13 mm is due",
        ),
        ({"bracing": "yes"}, InputError, "bracing: got 'yes'; True or False is due"),
        ({"k_te": 0.9}, InputError, "k_te_reason: missing"),
        ({"k_te": "abc", "k_te_reason": "by test"}, UnitError, "k_te: got 'abc'"),
        ({"plate": None}, InputError, "plate: got None; a Gusset is due"),
        ({"sleeve_diameter": "45 mm"}, InputError, "sleeve_diameter: given without a sleeve"),
        ({"engagement": "30 mm"}, InputError, "engagement: given without a sleeve"),
        ({"sleeve_steel": SECTION_STEEL}, InputError, "sleeve_steel: given without a sleeve"),
        (SLEEVE | {"sleeve_diameter": None}, UnitError, "sleeve_diameter: got nothing"),
        (SLEEVE | {"engagement": None}, UnitError, "engagement: got nothing"),
        (SLEEVE | {"sleeve_steel": ""}, InputError, "sleeve_steel: name the grade of a sleeve"),
        (
            SLEEVE | {"sleeve_diameter": "24 mm"},
            InputError,
            "sleeve_diameter: got 24 mm; more than the thread's 24 mm is due",
        ),
    ],
)
def test_what_is_refused(changes, error, says):
    with pytest.raises(error, match=says):
        threaded(**changes)


@pytest.mark.parametrize(
    ("plate", "says"),
    [
        (lambda: lug(width=None), "plate.width: missing; the lug needs it"),
        (lambda: lug(width="26 mm"), "plate.width: got 26 mm; the hole would cut the edge"),
        (lambda: lug(compression="20 kN"), "plate.compression: given for the lug"),
        (
            lambda: lug(shape=OUTLINE),
            "plate.shape: given for the lug",
        ),
        (lambda: Covers("16 mm", PLATE_STEEL, "100 mm", number=1), "a Gusset is due"),
    ],
)
def test_a_lug_states_no_more_than_is_checked(plate, says):
    with pytest.raises(InputError, match=says):
        threaded(plate=plate())


def test_a_lug_may_hang_by_bolts_in_tension():
    """The stem of a hanger: its bolts are checked beside the rod's own checks."""
    hanger = tl.Hanger(
        bolts="M20 8.8/S",
        threads="in shear plane",
        number=2,
        gauge="100 mm",
        tributary="100 mm",
        thickness="16 mm",
        steel=SECTION_STEEL,
    )
    alone = {c.name for c in tl.design(member("24 RB", threaded()), "60 kN").checks}
    hung = tl.design(member("24 RB", threaded(plate=lug(hanger=hanger))), "60 kN")
    assert {c.name for c in hung.checks} > alone


def test_a_copy_with_a_field_changed():
    assert threaded().but(thread="M20").thread == "M20"
    with pytest.raises(InputError, match="'threads' is not a field"):
        threaded().but(threads="M20")


def test_only_a_round_bar_has_a_thread():
    with pytest.raises(InputError, match="cannot be threaded"):
        tl.design(member("150x20 FL", threaded()), "60 kN")
