"""A Quantity as a value: arithmetic, comparison, display, copying."""

import copy
import math
import pickle
from dataclasses import FrozenInstanceError, dataclass, field
from typing import Any

import forallpeople
import numpy as np
import pytest
from forallpeople import Physical
from forallpeople.dimensions import Dimensions
from hypothesis import given
from hypothesis import strategies as st

from tensionlib import units
from tensionlib.errors import InputError, UnitError
from tensionlib.quantities import (
    ANGLE,
    AREA,
    COUNT,
    FACTOR,
    FORCE,
    FORCE_PER_LENGTH,
    LENGTH,
    MOMENT,
    PRESSURE,
    STRESS,
    US,
    VOLUME,
    WELD_STRENGTH,
    Quantity,
    parse,
    quantity,
    role_of,
)
from tensionlib.units import MPa, deg, inch, kg, kip, kN, kNm, kPa, m, mm

AREA_GROSS = 1860 * mm**2
METRE = Physical(1, Dimensions(0, 1, 0, 0, 0, 0, 0), 1)
SECOND = Physical(1, Dimensions(0, 0, 1, 0, 0, 0, 0), 1)
KELVIN = Physical(1, Dimensions(0, 0, 0, 0, 0, 1, 0), 1)
PASCAL = Physical(1, Dimensions(1, -1, -2, 0, 0, 0, 0), 1)


def assert_is(value: Any, internal: float, role: Any) -> None:
    assert type(value) is Quantity
    assert value.internal == pytest.approx(internal, rel=1e-11)
    assert value.role is role or value.role == role


def test_it_is_a_forallpeople_value() -> None:
    force = 285 * kN
    assert isinstance(force, Physical)
    assert force.value == 285000.0
    assert force.dimensions == Dimensions(1, 1, -2, 0, 0, 0, 0)
    assert AREA_GROSS.value == pytest.approx(0.00186, rel=1e-12)
    assert (440 * MPa).value == 440e6
    assert (440 * MPa).dimensions == PASCAL.dimensions


@pytest.mark.parametrize(
    ("value", "internal", "role"),
    [
        (285 * kN / AREA_GROSS, 285000 / 1860, STRESS),
        (AREA_GROSS * (300 * MPa), 558000.0, FORCE),
        (285 * kN * (2 * m), 570e6, MOMENT),
        (6 * kN / (2 * m), 3.0, FORCE_PER_LENGTH),
        (AREA_GROSS / (10 * mm), 186.0, LENGTH),
        (mm * mm, 1.0, AREA),
        (AREA_GROSS**0.5, math.sqrt(1860), LENGTH),
        (AREA_GROSS.sqrt(), math.sqrt(1860), LENGTH),
        ((8 * mm**3).sqrt(3), 2.0, LENGTH),
        ((8 * mm**3) ** (1 / 3), 2.0, LENGTH),
        ((mm ** (1 / 3)) ** 3, 1.0, LENGTH),
        (((8 * mm**3) ** (1 / 5)) ** 5, 8.0, VOLUME),
        (2 / (4 * mm), 0.5, role_of((0, -1, 0))),
        (1 / (2 / (4 * mm)), 2.0, LENGTH),
        (3 * kN * mm**4, 3000.0, role_of((1, 4, 0))),
        (-(285 * kN), -285000.0, FORCE),
        (+(285 * kN), 285000.0, FORCE),
        (abs(-285 * kN), 285000.0, FORCE),
        (2 * (5 * kPa), 0.01, PRESSURE),
        (5 * kPa + 1 * MPa, 1.005, PRESSURE),
        (1 * MPa + 5 * kPa, 1.005, STRESS),
        (1 * m - 1 * mm, 999.0, LENGTH),
        (2 * (30 * deg), math.pi / 3, ANGLE),
        (np.float64(2.0) * kN, 2000.0, FORCE),
        (kN * np.float64(2.0), 2000.0, FORCE),
        (kN / np.int64(2), 500.0, FORCE),
        (np.float64(2.0) / mm, 2.0, role_of((0, -1, 0))),
        (round(285.26 * kN, 1), 285300.0, FORCE),
        (round(285.26 * kN), 285000.0, FORCE),
        # Beside ordinary forallpeople values, on either side.
        (1 * mm + METRE, 1001.0, LENGTH),
        (METRE + 1 * mm, 1001.0, LENGTH),
        (METRE - 1 * mm, 999.0, LENGTH),
        (1 * mm - METRE, -999.0, LENGTH),
        (METRE * (2 * kN), 2e6, MOMENT),
        (2 * kN * METRE, 2e6, MOMENT),
        (2 * kN / METRE, 2.0, FORCE_PER_LENGTH),
        (METRE / (2 * kN), 0.5, role_of((-1, 1, 0))),
        (2 * kN / PASCAL, 2e9, AREA),
        (120 * kg * (9.81 * METRE / SECOND**2), 1177.2, FORCE),
        (1 / SECOND**2 * (120 * kg * (9.81 * METRE)), 1177.2, FORCE),
    ],
)
def test_arithmetic_gives_quantities(value: Any, internal: float, role: Any) -> None:
    assert_is(value, internal, role)


@pytest.mark.parametrize(
    ("value", "number"),
    [
        (285 * kN / (570 * kN), 0.5),
        (1 * m / (1 * mm), 1000.0),
        (METRE / (1 * mm), 1000.0),
        (1 * m / METRE, 1.0),
        (AREA_GROSS**0, 1.0),
        (30 * deg / (15 * deg), 2.0),
        (quantity(0.5, FACTOR) * 2, 1.0),
        (quantity(0.5, FACTOR) + 1, 1.5),
        (1 - quantity(0.25, FACTOR), 0.75),
        (-quantity(0.25, FACTOR), -0.25),
        (quantity(3, COUNT) / quantity(2, COUNT), 1.5),
    ],
)
def test_arithmetic_gives_a_float_where_no_dimension_is_left(value: Any, number: float) -> None:
    assert type(value) is float
    assert value == pytest.approx(number, rel=1e-12)


def test_a_difference_of_equals_is_nothing() -> None:
    assert 1.001 * 1000.0 != 1001.0
    assert str(1001 * mm - 1.001 * m) == "0 mm"
    assert str(1001 * mm + -1.001 * m) == "0 mm"
    assert str(-1.001 * m + 1001 * mm) == "0 mm"
    assert str(1.001 * METRE - 1.001 * m) == "0 mm"
    assert str(0.3 * m - 0.1 * m - 0.2 * m) == "0 mm"
    assert str(62 * kip - parse("62 kip")) == "0 kN"


def test_the_view_of_the_quantity_stays_on_either_side() -> None:
    length = quantity(25.4, LENGTH, US)
    for value in (length * METRE, METRE * length, METRE / (1 / length)):
        assert value.view is US
    assert str(length + METRE) == str(METRE + length) == "40.37 in"


def test_a_factor_times_a_force_is_a_force() -> None:
    assert_is(quantity(0.9, FACTOR) * (300 * kN), 270000.0, FORCE)


def test_time_and_temperature_stay_with_forallpeople() -> None:
    speed = 2 * m / SECOND
    assert type(speed) is Physical
    assert speed.value == pytest.approx(2.0)
    assert type(2 * kN * KELVIN) is Physical
    assert type(KELVIN / (2 * mm)) is Physical


@pytest.mark.parametrize(
    ("work", "words"),
    [
        (lambda: AREA_GROSS + 10, "cannot add 1860 mm², an area, and 10, a bare number"),
        (lambda: 10 + AREA_GROSS, "cannot add 1860 mm², an area, and 10, a bare number"),
        (lambda: AREA_GROSS + 0, "cannot add"),
        (lambda: 0.0 + AREA_GROSS, "cannot add"),
        (lambda: AREA_GROSS - 10.5, "cannot subtract 1860 mm², an area, and 10.5, a bare number"),
        (lambda: 10 - AREA_GROSS, "cannot subtract"),
        (lambda: AREA_GROSS + math.nan, "cannot add"),
        (lambda: AREA_GROSS + np.float64(10), "cannot add"),
        (lambda: np.float64(10) + AREA_GROSS, "cannot add"),
        (lambda: AREA_GROSS + np.array([1.0, 2.0]), "cannot add"),
        (lambda: AREA_GROSS + 3 * mm, "cannot add 1860 mm², an area, and 3 mm, a length"),
        (lambda: AREA_GROSS + METRE, "cannot add"),
        (lambda: METRE - AREA_GROSS, "cannot subtract"),
        (lambda: 30 * deg + 1, "cannot add 30 deg, an angle, and 1, a bare number"),
        (lambda: 30 * deg + quantity(1, FACTOR), "cannot add 30 deg, an angle, and 1, a factor"),
        (lambda: AREA_GROSS < 10, "cannot compare 1860 mm², an area, with 10, a bare number"),
        (lambda: 10 < AREA_GROSS, "cannot compare"),
        (lambda: AREA_GROSS <= 3 * mm, "with 3 mm, a length"),
        (lambda: AREA_GROSS > METRE, "cannot compare"),
        (lambda: METRE >= AREA_GROSS, "cannot compare"),
        (lambda: max(AREA_GROSS, 0), "cannot compare"),
        (lambda: math.sqrt(355 * MPa), "355 MPa is a stress, not a plain number"),
        (lambda: float(355 * MPa), "take the number of a unit, for example .value_in('MPa')"),
        (lambda: int(355 * MPa), "not a plain number"),
        (lambda: np.asarray([355 * MPa], dtype=float), "not a plain number"),
        (lambda: kN ** (2 * mm), "cannot raise 1 kN, a force, to the power 2 mm, a length"),
    ],
)
def test_refused(work: Any, words: str) -> None:
    with pytest.raises(UnitError) as caught:
        work()
    assert words in str(caught.value)


def test_a_root_of_a_negative_quantity_is_refused() -> None:
    with pytest.raises(InputError, match="cannot take a root of -4 mm², an area"):
        (-4 * mm**2) ** 0.5


@pytest.mark.parametrize(
    "work",
    [
        lambda: kN + "1 kN",
        lambda: "1 kN" + kN,
        lambda: kN - None,
        lambda: kN * "3",
        lambda: kN < "1 kN",
        lambda: kN / [1],
    ],
)
def test_other_things_are_pythons_type_error(work: Any) -> None:
    with pytest.raises(TypeError):
        work()


def test_sums_least_and_sorting() -> None:
    parts = [3 * m, 2 * mm, 1 * inch]
    assert sum(parts).internal == 3027.4
    assert min(parts) is parts[1]
    assert [q.internal for q in sorted(parts)] == [2.0, 25.4, 3000.0]
    total = 1 * mm
    total += 2 * mm
    total *= 2
    total -= 1 * mm
    total /= 5
    assert_is(total, 1.0, LENGTH)


def test_arrays_of_quantities() -> None:
    lengths = np.array([1.0, 2.0]) * mm
    assert [str(q) for q in lengths] == ["1 mm", "2 mm"]
    assert [str(q) for q in mm * np.array([1.0, 2.0])] == ["1 mm", "2 mm"]
    assert [str(q) for q in 1 * mm + lengths] == ["2 mm", "3 mm"]
    assert [str(q) for q in lengths - 1 * mm] == ["0 mm", "1 mm"]
    assert list(1.5 * mm < lengths) == [False, True]
    assert str(lengths.sum()) == "3 mm"
    assert [str(q) for q in np.sqrt(lengths * lengths)] == ["1 mm", "2 mm"]


def test_equality_and_hash() -> None:
    assert 70 * mm == 0.07 * m
    assert hash(70 * mm) == hash(0.07 * m)
    assert 70 * mm == (70 * mm).to("in")
    assert hash(70 * mm) == hash((70 * mm).to("in"))
    assert quantity(5, FORCE_PER_LENGTH) == quantity(5, WELD_STRENGTH)
    assert hash(quantity(5, FORCE_PER_LENGTH)) == hash(quantity(5, WELD_STRENGTH))
    assert 1 * m == METRE
    assert METRE == 1 * m
    assert 1 * m != 2 * METRE
    assert 70 * mm != 70.001 * mm
    assert 70 * mm != 70
    assert 70 * mm != 0.07
    assert 1 * mm != 1 * mm**2
    assert 70 * mm != "70 mm"
    assert (70 * mm == None) is False  # noqa: E711
    assert quantity(0.9, FACTOR) == 0.9
    assert hash(quantity(0.9, FACTOR)) == hash(0.9)
    assert 1 * units.rad != 1
    assert 1 * units.rad != quantity(1, FACTOR)
    assert math.nan * mm != math.nan * mm
    assert len({70 * mm, 0.07 * m, 7 * units.cm, 71 * mm}) == 2


def test_comparison() -> None:
    assert 1 * mm < 1 * m
    assert 1 * m <= METRE
    assert 2 * METRE > 1 * m
    assert METRE >= 1 * m
    assert not 1 * m < METRE
    assert quantity(2, COUNT) < 3
    assert 3 > quantity(2, COUNT)


def test_an_angle_goes_into_trigonometry() -> None:
    assert math.cos(60 * deg) == pytest.approx(0.5, rel=1e-11)
    assert float(quantity(0.85, FACTOR)) == 0.85
    assert int(quantity(3.0, COUNT)) == 3


def test_the_unit_is_fixed_and_never_prefixed() -> None:
    assert str(4.6 * m) == "4600 mm"
    assert str(0.75 * inch) == "19.05 mm"
    assert str(0.000004 * mm) == "0.000004 mm"
    assert str(1e6 * kN) == "1000000 kN"
    assert str(5 * kNm) == "5 kN·m"
    assert str(kN * m) == "1 kN·m"
    assert repr(285 * kN) == "285 kN"
    assert str(quantity(19.05, LENGTH, US)) == "0.75 in"


def test_readings() -> None:
    area = -1860 * mm**2
    latex = r"\left(-1860\ \text{mm}^{2}\right)"
    assert area.latex == latex
    assert area._repr_latex_() == f"${latex}$"
    assert area._repr_html_() == area._repr_markdown_() == area.html == "-1860 mm²"
    assert f"{area}" == f"{area:H}" == "-1860 mm²"
    assert f"{area:.3fL}" == f"{area:L}" == f"{area:.3eL}" == latex
    assert f"{area:.3fL$}" == f"${latex}$"
    assert f"{285.26 * kN:.1f}" == "285.3 kN"
    assert f"{285 * kN!s:>8}" == "  285 kN"


def test_no_reading_trips_handcalcs() -> None:
    for value in (285 * kN, -3 * mm, 3 * kN * mm**4, 12e6 * mm**4, 2 / mm, kN**0.5):
        assert not set("_<>=$") & set(str(value))


def test_to_another_unit() -> None:
    force = 285 * kN
    assert str(force.to("kip")) == "64.071 kip"
    assert force.to("kip").latex == r"64.071\ \text{kip}"
    assert force.to("kip").internal == force.internal
    assert force.to("kip").role is FORCE
    assert str(2 * force.to("kip")) == "128.14 kip"
    assert str(force.to("kip") + 1 * kN) == "64.295 kip"
    assert str(force) == "285 kN"
    assert str((12.3e6 * mm**4).to("cm4")) == "1230 cm⁴"
    assert str((12.3e6 * mm**4).to("10^3 mm4")) == "12300 × 10³ mm⁴"
    assert (30 * deg).value_in("deg") == 30.0
    assert (0.75 * inch).value_in("in") == 0.75
    assert (285 * kN).value_in("N") == 285000.0


@pytest.mark.parametrize(
    ("unit", "error", "words"),
    [
        ("kipp", InputError, "'kipp' is not a known unit. Did you mean 'kip'"),
        ("", InputError, "'' is not a known unit. Known units are mm, cm"),
        ("10⁶", InputError, "is not a known unit"),
        ("mm", UnitError, "285 kN is a force; 'mm' is a unit of length"),
    ],
)
def test_to_refuses(unit: str, error: type[Exception], words: str) -> None:
    for work in ((285 * kN).to, (285 * kN).value_in):
        with pytest.raises(error) as caught:
            work(unit)
        assert words in str(caught.value)


def test_an_angle_has_no_plain_unit() -> None:
    with pytest.raises(UnitError):
        (30 * deg).to("m/m")


def test_the_way_out_to_forallpeople() -> None:
    plain = (70 * mm).si()
    assert type(plain) is Physical
    assert plain.value == 0.07
    number, one = (70 * mm).split()
    assert number * one == 70 * mm
    number, one = (285 * kN).split(base_value=False)
    assert number == 285.0
    assert one == 1 * kN


def test_it_cannot_be_changed() -> None:
    force = 285 * kN
    for name in ("internal", "role", "view", "unit", "value", "dimensions", "other"):
        with pytest.raises(AttributeError):
            setattr(force, name, 1)
    with pytest.raises(AttributeError):
        del force.internal
    assert force.internal == 285000.0


@pytest.mark.parametrize(
    "value", [285 * kN, (62 * kip).to("kip"), 3 * kN * mm**4, quantity(5.0, FORCE, US), 30 * deg]
)
def test_copies(value: Quantity) -> None:
    for copied in (pickle.loads(pickle.dumps(value)), copy.copy(value), copy.deepcopy([value])[0]):
        assert type(copied) is Quantity
        assert copied == value
        assert hash(copied) == hash(value)
        assert str(copied) == str(value)
        assert copied.role == value.role
        assert copied.view == value.view
        assert copied.dimensions == value.dimensions
        assert copied.value == value.value


@dataclass(frozen=True)
class Plate:
    """A dataclass with quantities for fields."""

    width: Quantity
    thickness: Quantity = 10 * mm
    hole: Quantity = field(default=22 * mm)


def test_a_quantity_is_a_good_dataclass_field() -> None:
    plate = Plate(100 * mm)
    assert plate == Plate(0.1 * m)
    assert hash(plate) == hash(Plate(0.1 * m))
    assert repr(plate) == "Plate(width=100 mm, thickness=10 mm, hole=22 mm)"
    assert pickle.loads(pickle.dumps(plate)) == plate
    with pytest.raises(FrozenInstanceError):
        plate.width = 1 * mm  # type: ignore[misc]


NUMBERS = st.floats(1e-3, 1e6)


@given(NUMBERS, NUMBERS)
def test_the_same_answer_in_either_system(width: float, force: float) -> None:
    """Stress = force over a square, reckoned from millimetres and newtons or inches and kips."""
    inches, kips = width / 25.4, force / 4448.2216152605
    here = quantity(force, FORCE) / quantity(width, LENGTH) ** 2
    there = (kips * kip) / (inches * inch) ** 2
    plain = forallpeople.Physical(force, FORCE_DIMENSIONS, 1) / (width / 1000 * METRE) ** 2
    assert here.internal == pytest.approx(force / width**2, rel=1e-10)
    assert there.internal == pytest.approx(here.internal, rel=1e-10)
    assert plain.value == pytest.approx(here.value, rel=1e-10)


FORCE_DIMENSIONS = Dimensions(1, 1, -2, 0, 0, 0, 0)


@given(st.floats(-1e9, 1e9))
def test_internal_holds_twelve_figures(x: float) -> None:
    value = quantity(x, LENGTH)
    assert value.internal == float(f"{x:.12g}")
    assert value.value * 1000 == pytest.approx(x, rel=1e-11)


# What each unit is in N, mm, MPa, kg or rad.
UNIT_SIZES = {
    "N": 1.0,
    "kN": 1e3,
    "MN": 1e6,
    "lbf": 4.4482216152605,
    "kip": 4448.2216152605,
    "mm": 1.0,
    "cm": 10.0,
    "m": 1000.0,
    "inch": 25.4,
    "ft": 304.8,
    "Pa": 1e-6,
    "kPa": 1e-3,
    "MPa": 1.0,
    "GPa": 1e3,
    "psi": 0.006894757293168,
    "ksi": 6.894757293168,
    "psf": 4.788025898034e-5,
    "ksf": 0.04788025898034,
    "kg": 1.0,
    "tonne": 1000.0,
    "lb": 0.45359237,
    "deg": 0.0174532925199,
    "rad": 1.0,
    "kNm": 1e6,
}


@pytest.mark.parametrize("name", sorted(UNIT_SIZES))
def test_a_number_times_a_unit_is_what_the_text_says(name: str) -> None:
    unit = getattr(units, name)
    written = {"inch": "in", "tonne": "t"}.get(name, name)
    for number in ("3", "30", "62", "99", "275", "8.5", "0.07", "1.001", "123.456"):
        assert (float(number) * unit).internal == parse(f"{number} {written}").internal
        assert (float(number) * unit) / unit == pytest.approx(float(number), rel=1e-15)


def test_units_of_the_units_module() -> None:
    assert set(units.__all__) == set(UNIT_SIZES)
    for name, size in UNIT_SIZES.items():
        unit = getattr(units, name)
        assert type(unit) is Quantity
        assert unit.internal == pytest.approx(size, rel=1e-11)
    assert units.kPa.role is PRESSURE
    assert units.MPa.role is STRESS
    assert units.kNm == parse("1 kN·m")
