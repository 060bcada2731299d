"""The door takes quantities of the right kind and refuses the rest in plain words."""

import math
from decimal import Decimal
from fractions import Fraction
from typing import Any

import forallpeople
import numpy as np
import pytest
from forallpeople.dimensions import Dimensions

from tensionlib.errors import InputError, UnitError
from tensionlib.quantities import (
    ANGLE,
    CODE,
    COUNT,
    FACTOR,
    FORCE,
    LENGTH,
    PRESSURE,
    STRESS,
    US,
    WELD_STRENGTH,
    Quantity,
    count,
    door,
    factor,
    quantity,
    role_of,
)
from tensionlib.units import deg, kip, kN, kPa, m, mm

SECOND = forallpeople.Physical(1, Dimensions(0, 0, 1, 0, 0, 0, 0), 1)


def test_takes_a_quantity_unchanged() -> None:
    length = 4.6 * m
    assert door("length", length, LENGTH) is length


def test_takes_text() -> None:
    taken = door("length", "4.6 m", LENGTH)
    assert type(taken) is Quantity
    assert taken.internal == 4600.0
    assert taken.role is LENGTH


def test_takes_an_ordinary_forallpeople_value() -> None:
    taken = door("N", forallpeople.Physical(285000, Dimensions(1, 1, -2, 0, 0, 0, 0), 1), FORCE)
    assert type(taken) is Quantity
    assert taken.internal == 285000.0
    assert str(taken) == "285 kN"


def test_takes_a_forallpeople_value_with_a_factor_or_a_prefix() -> None:
    """Whatever unit it is displayed in, the SI number is what counts."""
    metres = Dimensions(0, 1, 0, 0, 0, 0, 0)
    feet = forallpeople.Physical(0.3048, metres, 1 / Fraction("0.3048"))
    assert door("length", feet, LENGTH).internal == 304.8
    prefixed = forallpeople.Physical(0.07, metres, 1).prefix("m")
    assert door("length", prefixed, LENGTH).internal == 70.0


def test_gives_the_role_that_was_asked_for() -> None:
    wind = door("wind pressure", "0.5 kN/m2", PRESSURE)
    assert wind.role is PRESSURE
    assert str(wind) == "0.5 kPa"
    assert str(door("v_w", "1200 N/mm", WELD_STRENGTH)) == "1.2 kN/mm"
    assert str(door("f", 5 * kPa, STRESS)) == "0.005 MPa"


def test_keeps_the_unit_and_view_the_user_chose() -> None:
    assert str(door("N", (62 * kip).to("kip"), FORCE)) == "62 kip"
    assert str(door("p", (5 * kPa).to("MPa"), STRESS)) == "0.005 MPa"
    assert str(door("p", (5 * kPa).to("Pa"), STRESS)) == "5000 Pa"
    assert door("N", quantity(1000.0, FORCE, US), FORCE).view is US


BARE = [4600, 4600.0, np.float64(4600.0), np.int64(4600), Fraction(4600)]


@pytest.mark.parametrize("value", BARE)
def test_refuses_a_bare_number(value: Any) -> None:
    with pytest.raises(UnitError) as caught:
        door("length", value, LENGTH)
    assert str(caught.value) == (
        f"length: got {value}, a bare number; give a length with its unit, "
        "for example '4600 mm' or 4.6*m"
    )


def test_refuses_the_wrong_dimension() -> None:
    with pytest.raises(UnitError) as caught:
        door("N", 285 * mm, FORCE)
    assert str(caught.value) == (
        "N: got 285 mm, a length; a force is due, for example '285 kN' or 285*kN"
    )
    with pytest.raises(UnitError, match="N: got '285 mm', a length; a force is due"):
        door("N", "285 mm", FORCE)


@pytest.mark.parametrize(
    ("value", "words"),
    [
        (None, "N: got nothing (None); a force is due, for example '285 kN'"),
        (True, "N: got True; a force is due"),
        (np.bool_(True), "a force is due"),
        (np.array([1.0, 2.0]), "N: got several values (ndarray); one is due"),
        (np.array([1 * kN, 2 * kN]), "N: got several values (ndarray); one is due"),
        ([1 * kN], "N: got several values (list); one is due"),
        ({}, "N: got several values (dict); one is due"),
        (Decimal("285"), "N: got Decimal('285'); a force is due"),
        (285j, "N: got 285j; a force is due"),
        ("285", "N: got '285', a number without a unit; give its unit, as in '285 kN'"),
        (SECOND, "N: got 1.000 s, which is not a force"),
        (3 * kN * mm**4, "N: got 3000 N·mm⁴, a quantity in N·mm⁴; a force is due"),
    ],
)
def test_refuses_what_is_no_force(value: Any, words: str) -> None:
    with pytest.raises(UnitError) as caught:
        door("N", value, FORCE)
    assert words in str(caught.value)


@pytest.mark.parametrize(
    ("value", "words"),
    [
        (math.nan * kN, "N: got not a number; a finite number is due"),
        (math.inf * kN, "N: got ∞ kN; a finite number is due"),
        (-math.inf * kN, "N: got -∞ kN; a finite number is due"),
        ("", "N: got an empty text"),
        ("285 KN", "N: got '285 KN': 'KN' is not a known unit. Did you mean 'kN'"),
        ("1,250 kN", "N: got '1,250 kN': a comma"),
        ("heavy", "N: got 'heavy', which is no number with a unit, such as '285 kN'"),
    ],
)
def test_refuses_what_cannot_be_used(value: Any, words: str) -> None:
    with pytest.raises(InputError) as caught:
        door("N", value, FORCE)
    assert words in str(caught.value)


def test_limits_are_internal_and_printed_in_display_units() -> None:
    assert door("N", 285 * kN, FORCE, at_least=285000.0, at_most=285000.0).internal == 285000.0
    assert door("t", "0.1 mm", LENGTH, above=0.0).internal == 0.1
    with pytest.raises(InputError, match=r"^N: got -1 kN; it must be at least 0 kN$"):
        door("N", -1 * kN, FORCE, at_least=0.0)
    with pytest.raises(InputError, match=r"^t: got 0 mm; it must be above 0 mm$"):
        door("t", "0 mm", LENGTH, above=0.0)
    with pytest.raises(InputError, match=r"^N: got 300 kN; it must be at most 250 kN$"):
        door("N", "300 kN", FORCE, at_most=250e3)
    with pytest.raises(InputError, match=r"^N: got 0.1 kip; it must be above 1 kip$"):
        door("N", (0.1 * kip).to("kip"), FORCE, above=4448.2216152605)


def test_a_miss_by_little_is_told_with_enough_figures() -> None:
    with pytest.raises(InputError, match=r"got 49.999999 mm; it must be at least 50 mm"):
        door("pitch", "49.999999 mm", LENGTH, at_least=50.0)


def test_the_example_can_be_the_callers() -> None:
    with pytest.raises(UnitError, match=r"for example '70 mm'$"):
        door("pitch", 70, LENGTH, example="'70 mm'")


def test_the_example_of_an_unnamed_dimension_works() -> None:
    role = role_of((1, 3, 0))
    with pytest.raises(UnitError, match="for example '1 N·mm³'"):
        door("x", 3, role)
    assert door("x", "1 N·mm³", role).internal == 1.0


def test_a_plain_number_is_taken_where_one_is_due_and_an_angle_is_not() -> None:
    assert door("n", 3, COUNT).internal == 3.0
    assert door("k", 0.85, FACTOR).internal == 0.85
    assert door("row", 7, CODE).role is CODE
    assert door("k", quantity(0.85, FACTOR), FACTOR).internal == 0.85
    assert door("theta", 30 * deg, ANGLE).internal == pytest.approx(math.pi / 6, rel=1e-12)
    with pytest.raises(UnitError, match="theta: got 30, a bare number"):
        door("theta", 30, ANGLE)
    with pytest.raises(UnitError, match=r"k: got 30 deg, an angle; a factor is due.*0\.85"):
        door("k", 30 * deg, FACTOR)
    with pytest.raises(UnitError, match=r"theta: got 0\.85, a factor; an angle is due"):
        door("theta", quantity(0.85, FACTOR), ANGLE)
    with pytest.raises(UnitError, match="n: got True"):
        door("n", True, COUNT)
    with pytest.raises(InputError, match=r"n: got 2\.5; a whole number"):
        door("n", 2.5, COUNT)


@pytest.mark.parametrize("value", [3, 3.0, np.int64(3), np.float64(3.0), quantity(3.0, COUNT)])
def test_count_takes(value: Any) -> None:
    taken = count("bolts", value)
    assert taken == 3
    assert type(taken) is int


@pytest.mark.parametrize(
    ("value", "error", "words"),
    [
        (0, InputError, "bolts: got 0; it must be at least 1"),
        (9, InputError, "bolts: got 9; it must be at most 8"),
        (2.5, InputError, "bolts: got 2.5; a whole number is due"),
        (math.nan, InputError, "bolts: got nan; a whole number is due"),
        (math.inf, InputError, "bolts: got inf; a whole number is due"),
        (True, UnitError, "bolts: got True; a whole number is due"),
        ("3", UnitError, "bolts: got '3'; a whole number is due"),
        (None, UnitError, "bolts: got None; a whole number is due"),
        (3 * mm, UnitError, "bolts: got 3 mm; a whole number is due"),
    ],
)
def test_count_refuses(value: Any, error: type[Exception], words: str) -> None:
    with pytest.raises(error) as caught:
        count("bolts", value, at_most=8)
    assert words in str(caught.value)


def test_count_from_zero() -> None:
    assert count("bolts", 0, at_least=0) == 0


@pytest.mark.parametrize("value", [0.85, np.float64(0.85), quantity(0.85, FACTOR)])
def test_factor_takes(value: Any) -> None:
    taken = factor("k", value)
    assert taken == 0.85
    assert type(taken) is float
    assert factor("k", 1) == 1.0


@pytest.mark.parametrize(
    ("value", "error", "words"),
    [
        (0.0, InputError, "k: got 0; it must be above 0"),
        (1.1, InputError, "k: got 1.1; it must be at most 1"),
        (math.nan, InputError, "k: got nan; a finite number is due"),
        (math.inf, InputError, "k: got inf; a finite number is due"),
        (True, UnitError, "k: got True; a plain number without a unit is due"),
        ("0.85", UnitError, "k: got '0.85'; a plain number without a unit is due"),
        (30 * deg, UnitError, "k: got 30 deg; a plain number without a unit is due"),
        (3 * mm, UnitError, "k: got 3 mm; a plain number without a unit is due"),
    ],
)
def test_factor_refuses(value: Any, error: type[Exception], words: str) -> None:
    with pytest.raises(error) as caught:
        factor("k", value, above=0.0, at_most=1.0)
    assert words in str(caught.value)


def test_factor_at_least() -> None:
    with pytest.raises(InputError, match=r"k: got 0.5; it must be at least 0.75"):
        factor("k", 0.5, at_least=0.75)
