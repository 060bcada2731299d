"""Packing, slip and long joints, through a regular end and through a pattern; figures by hand.

M20 8.8 with threads in the shear plane: V_f = 0.62·830·225 = 115.785 kN, φV_f = 92.628 kN.
"""

from __future__ import annotations

from typing import Any

import pytest

import tensionlib as tl
from tensionlib import Hole, Pattern
from tensionlib.errors import InputError, UnitError
from tests.builders import bolted, gusset, member

V_F = 0.62 * 830 * 225
PACKED = 0.85 * V_F  # 98.417 kN
LINE = Pattern.lines(3, ["60 mm"], "40 mm", "70 mm")


def pattern(holes: Pattern = LINE, **changes: Any) -> tl.BoltedPattern:
    usual = {
        "to": "long leg",
        "bolts": "M20 8.8/S",
        "threads": "in shear plane",
        "holes": holes,
        "plate": gusset(),
    }
    return tl.BoltedPattern(**usual | changes)


def regular(**changes: Any) -> tl.Bolted:
    return bolted(gauge="60 mm", **changes)


def design(end: Any, force: str = "120 kN", section: str = "150x100x12 UA", **more: Any) -> Any:
    return tl.design(member(section, end), force, **more)


def near(value: Any, due: float) -> bool:
    return float(value.internal) == pytest.approx(due, rel=1e-9)


def of_one_bolt(calc: tl.Calculation) -> float:
    """Design shear capacity of one bolt, however the end writes it."""
    names = [check.name for check in calc if check.part == "Bolts"]
    if "bolt shear" in names:
        return float(calc["bolt shear"].capacity.internal) / 3
    return float(calc["bolt shear, most loaded bolt"].capacity.internal)


BOTH = pytest.mark.parametrize("end", [regular, pattern], ids=["regular", "pattern"])

# Packing, 9.3.2.5 -------------------------------------------------------------------------


@BOTH
@pytest.mark.parametrize(
    ("packing", "nominal", "covered"),
    [
        (None, V_F, True),
        ("5 mm", V_F, True),
        ("6 mm", V_F, True),
        ("6.1 mm", PACKED, True),
        ("12 mm", PACKED, True),
        ("19.9 mm", PACKED, True),
        ("20 mm", PACKED, False),
        ("25 mm", PACKED, False),
    ],
)
def test_packing(end, packing, nominal, covered):
    """None taken off up to 6 mm, 15 % from more than 6 to less than 20 mm, no rule from 20."""
    calc = design(end(packing=packing))
    assert of_one_bolt(calc) == pytest.approx(0.8 * nominal, rel=1e-9)
    assert [line.title for line in calc.not_covered] == (
        [] if covered else ["bolts through packing"]
    )
    if not covered:
        assert calc.not_covered[0].clause == "9.3.2.5"
        assert calc.word == "NOT COVERED"


@BOTH
@pytest.mark.parametrize("standard", ["AS 4100", "AS 4100:1998"])
def test_packing_to_as_4100(end, standard):
    calc = design(end(packing="10 mm"), standard=standard)
    assert of_one_bolt(calc) == pytest.approx(0.8 * PACKED, rel=1e-9)


@BOTH
def test_packing_and_a_shank_in_two_planes(end):
    """0.85·0.62·830·2·314 = 274.687 kN."""
    plate = gusset()
    section = "2/150x100x12 UA, long legs, gap 12 mm"
    calc = design(end(packing="8 mm", threads="out of shear plane", plate=plate), "100 kN", section)
    assert of_one_bolt(calc) == pytest.approx(0.8 * 0.85 * 0.62 * 830 * 2 * 314, rel=1e-9)


# Slip, 9.3.3 ------------------------------------------------------------------------------


@BOTH
def test_slip_of_three_bolts(end):
    """0.7·3·0.35·1·145·1.0 = 106.575 kN; the force in service, not N*, is held against it."""
    check = design(end(bolts="M20 8.8/TF"), service="106.5 kN")["slip in service"]
    assert near(check.demand, 106.5e3)
    assert near(check.capacity, 106_575.0)
    assert (check.clause, check.verdict) == ("9.3.3.1", "pass")
    over = design(end(bolts="M20 8.8/TF"), service="106.6 kN")
    assert over["slip in service"].verdict == "fail"
    assert over.word == "FAIL"


@BOTH
def test_slip_on_two_planes_of_other_surfaces(end):
    """0.7·3·0.20·2·145 = 121.8 kN."""
    section = "2/150x100x12 UA, long legs, gap 12 mm"
    calc = design(end(bolts="M20 8.8/TF", slip_factor=0.20), "150 kN", section, service="100 kN")
    assert near(calc["slip in service"].capacity, 121_800.0)


@BOTH
@pytest.mark.parametrize("size", [("M16", 95.0), ("M24", 210.0)])
def test_slip_of_other_sizes(end, size):
    """Tension as installed 95 kN of M16, 210 of M24: 0.7·3·0.35 = 0.735 times it. From memory."""
    name, tension = size
    calc = design(end(bolts=f"{name} 8.8/TF"), service="50 kN")
    assert near(calc["slip in service"].capacity, 735.0 * tension)


@BOTH
def test_slip_without_a_force_in_service_is_not_covered(end):
    calc = design(end(bolts="M20 8.8/TF"))
    assert [line.title for line in calc.not_covered] == ["slip"]
    assert "service='150 kN'" in calc.not_covered[0].note
    assert calc.word == "NOT COVERED"


@BOTH
def test_slip_of_a_size_whose_tension_is_not_known_is_not_covered(end):
    calc = design(end(bolts="M22 8.8/TF"), service="50 kN")
    assert [line.title for line in calc.not_covered] == ["slip"]
    assert "tension of this bolt as installed is not known" in calc.not_covered[0].note


@BOTH
@pytest.mark.parametrize("category", ["S", "TB"])
def test_bolts_that_bear_have_no_slip_check(end, category):
    calc = design(end(bolts=f"M20 8.8/{category}"), service="900 kN")
    assert "slip in service" not in {check.name for check in calc}
    assert not calc.not_covered


@BOTH
def test_a_friction_joint_is_proven_in_bearing_too(end):
    assert of_one_bolt(design(end(bolts="M20 8.8/TF"), service="1 kN")) == pytest.approx(
        0.8 * V_F, rel=1e-9
    )


def test_a_bolt_left_out_does_not_hold():
    """0.7·2·0.35·145 = 71.05 kN."""
    calc = design(pattern(LINE.without_bolt("2"), bolts="M20 8.8/TF"), service="50 kN")
    assert near(calc["slip in service"].capacity, 71_050.0)


def test_the_worst_kind_of_hole_rules_the_whole_joint():
    """A long slot among standard and oversize holes: 106.575·0.70 = 74.6025 kN."""
    holes = Pattern(
        (
            Hole("1", "40 mm", "60 mm", kind="oversize"),
            Hole("2", "110 mm", "60 mm", kind="long slot", slot="across"),
            Hole("3", "180 mm", "60 mm"),
        )
    )
    calc = design(pattern(holes, bolts="M20 8.8/TF"), service="50 kN")
    assert near(calc["slip in service"].capacity, 74_602.5)
    # Without a bolt in it the slot plays no part: two bolts, 71.05·0.85 = 60.3925.
    empty = design(pattern(holes.without_bolt("2"), bolts="M20 8.8/TF"), service="50 kN")
    assert near(empty["slip in service"].capacity, 60_392.5)


def test_a_force_in_service_of_nothing():
    check = design(pattern(bolts="M20 8.8/TF"), service="0 kN")["slip in service"]
    assert (check.demand.internal, check.verdict) == (0.0, "no demand")


@pytest.mark.parametrize(
    ("service", "error", "message"),
    [
        (150, UnitError, "service: got 150, a bare number; .*'150 kN'"),
        ("150 mm", UnitError, "service: got '150 mm', a length; a force is due"),
        ("-1 kN", InputError, "service: got -1 kN; it must be at least 0"),
    ],
)
def test_a_force_in_service_that_is_none(service, error, message):
    with pytest.raises(error, match=message):
        design(pattern(), service=service)


@BOTH
@pytest.mark.parametrize(
    ("field", "value", "error", "message"),
    [
        ("packing", 8, UnitError, "packing: got 8, a bare number; .*'8 mm'"),
        ("packing", "0 mm", InputError, "packing: got 0 mm; it must be above 0 mm"),
        ("slip_factor", 1.1, InputError, "slip_factor: got 1.1; .* at most 1"),
        ("slip_factor", 0.0, InputError, "slip_factor: got 0; it must be above 0"),
    ],
)
def test_what_is_refused(end, field, value, error, message):
    with pytest.raises(error, match=message):
        end(**{field: value})


# Long joints, Table 9.3.2.1 ---------------------------------------------------------------


@pytest.mark.parametrize(
    ("length", "k_r"),
    [
        # 1.0 to 300 mm; 1.075 - L/4000 to 1300 mm; 0.75 beyond.
        (299, 1.0),
        (300, 1.0),
        (301, 1.075 - 301 / 4000),
        (800, 0.875),
        (1299, 1.075 - 1299 / 4000),
        (1300, 0.75),
        (1301, 0.75),
        (2000, 0.75),
    ],
)
def test_a_long_joint_of_a_pattern(length, k_r):
    holes = Pattern((*LINE.holes[:2], Hole("3", f"{40 + length} mm", "60 mm")))
    calc = design(pattern(holes))
    assert near(calc.value("L_j"), float(length))
    assert calc.value("k_r").internal == pytest.approx(k_r, rel=1e-9)
    assert of_one_bolt(calc) == pytest.approx(0.8 * V_F * k_r, rel=1e-9)


def test_the_length_of_a_staggered_joint_is_from_its_first_bolt_to_its_last():
    """Lines of 5 at 70 mm, the second 35 mm behind: 4·70 + 35 = 315 mm, 1.075 - 315/4000."""
    holes = Pattern.lines(5, ["55 mm", "115 mm"], "40 mm", "70 mm", ["0 mm", "35 mm"])
    calc = design(pattern(holes))
    assert near(calc.value("L_j"), 315.0)
    assert near(calc.value("k_r"), 0.99625)
    # A hole at the far end without a bolt does not lengthen the joint.
    assert near(design(pattern(holes.without_bolt("10"))).value("L_j"), 280.0)


def test_the_joint_of_two_legs_is_one_joint():
    """Long leg to 40 + 210, short leg to 320 + 70: 390 - 40 = 350."""
    holes = Pattern.lines(4, ["60 mm"], "40 mm", "70 mm") + Pattern.lines(
        2, ["55 mm"], "320 mm", "70 mm", element="short leg", first=5
    )
    assert near(design(pattern(holes)).value("L_j"), 350.0)


def test_bolts_abreast_have_no_length():
    holes = Pattern.lines(1, ["55 mm", "115 mm"], "40 mm")
    calc = design(pattern(holes))
    assert calc.value("k_r").internal == 1.0
    assert "L_j" not in {line.symbol.name for line in calc.sheet.lines if line.symbol}
