"""Roles carry dimensions; views give each role one unit of the right dimension."""

import copy
import pickle

import pytest

from tensionlib.errors import InputError, UnitError
from tensionlib.quantities import (
    ANGLE,
    AREA,
    CODE,
    COUNT,
    FACTOR,
    FORCE,
    FORCE_PER_LENGTH,
    INERTIA,
    LENGTH,
    MASS_PER_LENGTH,
    METRIC,
    MODULUS,
    MOMENT,
    NAMED_ROLES,
    PRESSURE,
    STRESS,
    US,
    WEIGHT_DENSITY,
    WELD_STRENGTH,
    Role,
    View,
    format_value,
    latex_value,
    parse,
    role_of,
)

METRIC_UNITS = [
    (LENGTH, "mm", 1.0),
    (AREA, "mm²", 1.0),
    (MODULUS, "mm³", 1.0),
    (INERTIA, "10⁶ mm⁴", 1e6),
    (FORCE, "kN", 1e3),
    (MOMENT, "kN·m", 1e6),
    (STRESS, "MPa", 1.0),
    (PRESSURE, "kPa", 1e-3),
    (FORCE_PER_LENGTH, "kN/m", 1.0),
    (WELD_STRENGTH, "kN/mm", 1e3),
    (WEIGHT_DENSITY, "kN/m³", 1e-6),
    (MASS_PER_LENGTH, "kg/m", 1e-3),
]

# Computed by hand from 25.4 mm, 0.45359237 kg and 9.80665 m/s2.
US_UNITS = [
    (LENGTH, "in", 25.4),
    (AREA, "in²", 645.16),
    (MODULUS, "in³", 16387.064),
    (INERTIA, "in⁴", 416231.4256),
    (FORCE, "kip", 4448.2216152605),
    (MOMENT, "kip·in", 112984.82902762),
    (STRESS, "ksi", 6.894757293168),
    (PRESSURE, "psf", 4.788025898034e-5),
    (FORCE_PER_LENGTH, "kip/in", 175.126835246476),
    (MASS_PER_LENGTH, "lb/ft", 0.00148816394356955),
]


@pytest.mark.parametrize(("role", "name", "size"), METRIC_UNITS)
def test_metric_units(role: Role, name: str, size: float) -> None:
    assert METRIC.unit(role).name == name
    assert METRIC.unit(role).size == size


@pytest.mark.parametrize(("role", "name", "size"), US_UNITS)
def test_us_units(role: Role, name: str, size: float) -> None:
    assert US.unit(role).name == name
    assert US.unit(role).size == pytest.approx(size, rel=1e-12)


@pytest.mark.parametrize("view", [METRIC, US])
@pytest.mark.parametrize("role", [r for r in NAMED_ROLES if not r.is_plain_number])
def test_every_role_has_a_unit_of_its_own_dimension(view: View, role: Role) -> None:
    unit = view.unit(role)
    read = parse(f"1 {unit.name}")
    assert read.role.exponents == role.exponents
    assert read.internal == pytest.approx(unit.size, rel=1e-11)
    assert parse(f"1 {unit.ascii}").internal == read.internal
    assert unit.ascii.isascii()


@pytest.mark.parametrize("role", [COUNT, FACTOR, CODE])
def test_plain_numbers_have_no_unit(role: Role) -> None:
    assert role.is_plain_number
    assert METRIC.unit(role).name == ""
    assert format_value(0.85, role) == "0.85"
    assert latex_value(0.85, role) == "0.85"


def test_an_angle_is_no_plain_number() -> None:
    assert ANGLE.dimensionless
    assert not ANGLE.is_plain_number
    assert not FORCE.is_plain_number


def test_a_bare_dimension_takes_the_first_role_that_has_it() -> None:
    assert role_of((1, -2, 0)) is STRESS
    assert role_of((1.0, -1.0, 0.0)) is FORCE_PER_LENGTH
    assert role_of((0, 0, 0)) is FACTOR


@pytest.mark.parametrize(
    ("exponents", "text", "latex"),
    [
        ((1, 3, 0), "2 N·mm³", r"2\ \text{N·mm}^{3}"),
        ((1, -5, 0), "2 N/mm⁵", r"2\ \text{N/mm}^{5}"),
        ((0, -1, 0), "2 mm⁻¹", r"2\ \text{mm}^{-1}"),
        ((2, 2, 0), "2 N²·mm²", r"2\ \text{N}^{2}\text{·mm}^{2}"),
        ((0.5, -1, 0), "2 N^0.5/mm", r"2\ \text{N}^{0.5}\text{/mm}"),
        ((-1, -1, 1), "2 kg·N⁻¹·mm⁻¹", r"2\ \text{kg·N}^{-1}\text{·mm}^{-1}"),
    ],
)
def test_a_dimension_without_a_role_gets_a_composed_unit(
    exponents: tuple[float, float, float], text: str, latex: str
) -> None:
    role = role_of(exponents)
    assert format_value(2.0, role) == text
    assert latex_value(2.0, role) == latex
    assert parse(text).internal == 2.0
    assert parse(text).role == role


def test_composed_units_of_the_us_view() -> None:
    role = role_of((1, 3, 0))
    size = 4448.2216152605 * 25.4**3
    assert US.unit(role).name == "kip·in³"
    assert US.unit(role).size == pytest.approx(size, rel=1e-12)


def test_a_role_of_ones_own_takes_the_unit_of_its_dimension() -> None:
    assert METRIC.unit(Role("slip", 0, 1, 0)).name == "mm"
    # The name alone does not make it a length.
    assert METRIC.unit(Role("length", 1, 0, 0)).name == "kN"


def test_but_changes_one_unit_and_leaves_the_view_alone() -> None:
    metres = METRIC.but(length="m", force_per_length="kN/mm", section_modulus="10³ mm³")
    assert format_value(4600.0, LENGTH, metres) == "4.6 m"
    assert format_value(6.3, FORCE_PER_LENGTH, metres) == "0.0063 kN/mm"
    assert format_value(52000.0, MODULUS, metres) == "52 × 10³ mm³"
    assert format_value(1860.0, AREA, metres) == "1860 mm²"
    assert format_value(4600.0, LENGTH, METRIC) == "4600 mm"
    assert metres.but(length="mm").unit(LENGTH) == METRIC.unit(LENGTH)


@pytest.mark.parametrize(
    ("units", "error", "words"),
    [
        ({"lenght": "m"}, InputError, "'lenght' is no role that has a unit. Did you mean 'length'"),
        ({"factor": "mm"}, InputError, "'factor' is no role that has a unit"),
        ({"length": "metre"}, InputError, "'metre' is not a known unit"),
        ({"length": "kN"}, UnitError, "length: 'kN' is a unit of force, not length"),
        ({"angle": "m/m"}, UnitError, "angle: 'm/m' is a unit of factor, not angle"),
    ],
)
def test_but_refuses(units: dict[str, str], error: type[Exception], words: str) -> None:
    with pytest.raises(error) as caught:
        METRIC.but(**units)
    assert words in str(caught.value)


def test_views_compare_by_their_units_and_survive_copying() -> None:
    metres = METRIC.but(length="m")
    assert metres == METRIC.but(length="m")
    assert hash(metres) == hash(METRIC.but(length="m"))
    assert metres != METRIC
    assert METRIC != "metric"
    for copied in (pickle.loads(pickle.dumps(metres)), copy.copy(metres), copy.deepcopy(metres)):
        assert copied == metres
        assert copied.unit(LENGTH).name == "m"


def test_views_and_roles_cannot_be_changed() -> None:
    with pytest.raises(AttributeError):
        METRIC.name = "other"
    with pytest.raises(AttributeError):
        del METRIC.name
    with pytest.raises(AttributeError):
        LENGTH.name = "width"  # type: ignore[misc]
    assert METRIC.name == "metric"


def test_roles_survive_pickling() -> None:
    for role in (LENGTH, role_of((1, 3, 0))):
        assert pickle.loads(pickle.dumps(role)) == role


def test_phrases() -> None:
    assert LENGTH.phrase == "a length"
    assert AREA.phrase == "an area"
    assert role_of((1, 3, 0)).phrase == "a quantity in N·mm³"
