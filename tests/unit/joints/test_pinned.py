"""Pinned: what passes its door, and what it says to what does not."""

from __future__ import annotations

import pytest

import tensionlib as tl
from tensionlib.errors import InputError, UnitError
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.pattern_end import Covers
from tensionlib.units import mm
from tests.builders import PLATE_STEEL, SECTION_STEEL, gusset, member

OUTLINE = tl.GussetShape(
    [("0 mm", "0 mm"), ("300 mm", "0 mm"), ("300 mm", "160 mm"), ("0 mm", "160 mm")],
    [3],
    ("100 mm", "80 mm"),
    "0 deg",
)


def fork(**changes):
    return gusset(**{"thickness": "16 mm", "width": "160 mm"} | changes)


def pinned(**changes):
    usual = {
        "pin": "40 mm",
        "pin_f_y": "350 MPa",
        "hole": "41 mm",
        "edge_beyond": "80 mm",
        "plate": fork(),
        "plate_edge_beyond": "80 mm",
    }
    return tl.Pinned(**usual | changes)


def test_every_dimension_becomes_a_quantity():
    end = pinned(pin=40 * mm, eye_width="0.16 m", gap="3 mm")
    found = {
        name: getattr(end, name).internal
        for name in ("pin", "pin_f_y", "hole", "edge_beyond", "plate_edge_beyond", "eye_width")
    }
    assert found == {
        "pin": 40.0,
        "pin_f_y": 350.0,
        "hole": 41.0,
        "edge_beyond": 80.0,
        "plate_edge_beyond": 80.0,
        "eye_width": 160.0,
    }
    assert end.gap.internal == 3.0
    assert (end.kind, end.to, end.rotates) == ("pinned", "plate", False)


@pytest.mark.parametrize(
    ("changes", "error", "says"),
    [
        ({"pin": 40}, UnitError, "pin: got 40, a bare number"),
        ({"pin": None}, UnitError, "pin: got nothing"),
        ({"pin": "0 mm"}, InputError, "pin: got 0 mm; it must be above"),
        ({"pin": "40 kN"}, UnitError, "pin: got '40 kN', a force; a length is due"),
        ({"pin_f_y": "350 mm"}, UnitError, "pin_f_y: got '350 mm', a length; a stress is due"),
        ({"pin_f_y": "0 MPa"}, InputError, "pin_f_y: got 0 MPa; it must be above"),
        ({"pin_f_y": None}, UnitError, "pin_f_y: got nothing"),
        ({"hole": "39 mm"}, InputError, "hole: got 39 mm; no less than the pin's 40 mm is due"),
        ({"gap": "-1 mm"}, InputError, "gap: got -1 mm; it must be at least"),
        ({"gap": None}, UnitError, "gap: got nothing"),
        ({"eye_width": 160}, UnitError, "eye_width: got 160, a bare number"),
        ({"edge_beyond": "20.5 mm"}, InputError, "edge_beyond: got 20.5 mm; the hole would cut"),
        (
            {"plate_edge_beyond": "20 mm"},
            InputError,
            "plate_edge_beyond: got 20 mm; .* more than 20.5 mm is due",
        ),
        ({"rotates": "no"}, InputError, "rotates: got 'no'; True or False is due"),
        ({"to": "leg"}, InputError, "to: got 'leg'; a pinned end is the eye of a flat"),
        ({"k_te": 0.9}, InputError, "k_te_reason: missing"),
        ({"k_te": 1.2, "k_te_reason": "by test"}, InputError, "k_te: got 1.2"),
        ({"plate": "16 mm"}, InputError, "plate: got '16 mm'; a Gusset is due"),
    ],
)
def test_what_is_refused(changes, error, says):
    with pytest.raises(error, match=says):
        pinned(**changes)


@pytest.mark.parametrize(
    ("plate", "says"),
    [
        (lambda: fork(width=None), "plate.width: missing; a fork plate needs it"),
        (lambda: fork(width="41 mm"), "plate.width: got 41 mm; the hole would cut the edge"),
        (lambda: fork(compression="20 kN"), "plate.compression: given for a fork plate"),
        (lambda: Covers("16 mm", PLATE_STEEL, "160 mm", number=1), "a Gusset is due"),
        (
            lambda: fork(
                hanger=Hanger(
                    bolts="M20 8.8/S",
                    threads="in shear plane",
                    number=2,
                    gauge="100 mm",
                    tributary="100 mm",
                    thickness="16 mm",
                    steel=SECTION_STEEL,
                )
            ),
            "plate.hanger: given for a fork plate",
        ),
    ],
)
def test_a_fork_plate_states_no_more_than_is_checked(plate, says):
    with pytest.raises(InputError, match=says):
        pinned(plate=plate())


def test_an_outline_of_a_fork_plate_is_refused():
    with pytest.raises(InputError, match="plate.shape: given for a fork plate"):
        pinned(plate=fork(shape=OUTLINE))


def test_width_of_the_eye():
    assert pinned().eye("150 mm") == 150.0
    assert pinned(eye_width="180 mm").eye("150 mm") == 180.0
    assert pinned(eye_width="150 mm").eye("150 mm") == 150.0
    with pytest.raises(InputError, match="eye_width: got 140 mm; no less than the flat's 150 mm"):
        pinned(eye_width="140 mm").eye("150 mm")
    with pytest.raises(InputError, match="hole: got 41 mm; less than the eye's width of 41 mm"):
        pinned().eye("41 mm")


def test_a_copy_with_a_field_changed():
    end = pinned().but(rotates=True)
    assert end.rotates is True
    assert end.but(rotates=False) == pinned()
    with pytest.raises(InputError, match="'rotate' is not a field"):
        pinned().but(rotate=True)


def test_only_a_flat_has_an_eye():
    with pytest.raises(InputError, match="cannot be pinned"):
        tl.design(member("150x90x10 UA", pinned()), "100 kN")


def test_a_hole_wider_than_the_flat_is_refused():
    wide = pinned(pin="80 mm", hole="81 mm")
    with pytest.raises(InputError, match="hole: got 81 mm; less than the eye's width of 75 mm"):
        tl.design(member("75x12 FL", wide), "10 kN")
