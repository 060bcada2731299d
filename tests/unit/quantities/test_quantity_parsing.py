"""Reading quantities from text, and lists of quantities."""

import contextlib
import math
from fractions import Fraction

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from tensionlib.errors import InputError, TensionlibError, UnitError
from tensionlib.quantities import (
    LENGTH,
    METRIC,
    NAMED_ROLES,
    US,
    Role,
    View,
    format_value,
    parse,
    quantity,
    steps,
    values,
)
from tensionlib.units import kN, mm

POUND_FORCE = 4.4482216152605  # N, from 0.45359237 kg and 9.80665 m/s2
KSI = 6.894757293168361  # MPa, the same over 25.4 mm squared

READ = [
    ("285 kN", 285000.0, "force"),
    ("285kN", 285000.0, "force"),
    (" 285\tkN ", 285000.0, "force"),
    ("285\u00a0kN", 285000.0, "force"),
    ("-5 kN", -5000.0, "force"),
    ("\u22125 kN", -5000.0, "force"),
    ("+5 kN", 5000.0, "force"),
    ("1.5e3 N", 1500.0, "force"),
    ("1.5E-3 MN", 1500.0, "force"),
    ("62 kip", 62000 * POUND_FORCE, "force"),
    ("62 kips", 62000 * POUND_FORCE, "force"),
    ("10 lbf", 10 * POUND_FORCE, "force"),
    ("12 mm", 12.0, "length"),
    (".5 mm", 0.5, "length"),
    ("5. mm", 5.0, "length"),
    ("2.4 m", 2400.0, "length"),
    ("7 cm", 70.0, "length"),
    ("0.07 m", 70.0, "length"),
    ("15 ft", 4572.0, "length"),
    ("15'", 4572.0, "length"),
    ("3/4 in", 19.05, "length"),
    ("3/4in", 19.05, "length"),
    ("3 / 4 in", 19.05, "length"),
    ('3/4"', 19.05, "length"),
    ("3/4\u2033", 19.05, "length"),
    ("¾ in", 19.05, "length"),
    ("1 1/2 in", 38.1, "length"),
    ("1-1/2 in", 38.1, "length"),
    ("1½ in", 38.1, "length"),
    ("-1 1/2 in", -38.1, "length"),
    ("0.75 inch", 19.05, "length"),
    ("6 in.", 152.4, "length"),
    ("1860 mm2", 1860.0, "area"),
    ("1860 mm^2", 1860.0, "area"),
    ("1860 mm²", 1860.0, "area"),
    ("2 in2", 1290.32, "area"),
    ("40 mm·mm", 40.0, "area"),
    ("440 MPa", 440.0, "stress"),
    ("440 N/mm2", 440.0, "stress"),
    ("440 N/mm^2", 440.0, "stress"),
    ("440 N/mm²", 440.0, "stress"),
    ("200 GPa", 200000.0, "stress"),
    ("36 ksi", 36 * KSI, "stress"),
    ("36000 psi", 36 * KSI, "stress"),
    ("0.5 kPa", 0.0005, "pressure"),
    ("500 Pa", 0.0005, "pressure"),
    ("100 psf", 100 * KSI / 144000, "pressure"),
    ("0.1 ksf", 100 * KSI / 144000, "pressure"),
    ("6.3 kN/m", 6.3, "force per length"),
    ("1.2 kN/mm", 1200.0, "force per length"),
    ("12 kN·m", 12e6, "moment"),
    ("12 kN.m", 12e6, "moment"),
    ("12 kN*m", 12e6, "moment"),
    ("12 kN m", 12e6, "moment"),
    ("12 kN-m", 12e6, "moment"),
    ("12 kNm", 12e6, "moment"),
    ("12 Nmm", 12.0, "moment"),
    ("12 kip-in", 12000 * POUND_FORCE * 25.4, "moment"),
    ("12 kip·ft", 12000 * POUND_FORCE * 304.8, "moment"),
    ("52e3 mm3", 52000.0, "volume"),
    ("10^6 mm4", 1e6, "inertia"),
    ("10⁶ mm⁴", 1e6, "inertia"),
    ("12.3e6 mm4", 12.3e6, "inertia"),
    ("12.3 x 10^6 mm4", 12.3e6, "inertia"),
    ("12.3×10^6 mm4", 12.3e6, "inertia"),
    ("12.3 × 10⁶ mm⁴", 12.3e6, "inertia"),
    ("12.3·10⁻³ m", 12.3, "length"),
    ("120 kg", 120.0, "mass"),
    ("1.2 t", 1200.0, "mass"),
    ("10 lb", 4.5359237, "mass"),
    ("14.6 kg/m", 0.0146, "mass per length"),
    ("10 lb/ft", 4.5359237 / 304.8, "mass per length"),
    ("7850 kg/m3", 7.85e-6, "density"),
    ("77 kN/m3", 7.7e-5, "weight density"),
    ("30 deg", math.pi / 6, "angle"),
    ("30°", math.pi / 6, "angle"),
    ("0.5 rad", 0.5, "angle"),
    ("0 kN", 0.0, "force"),
    ("0.25 m/m", 0.25, "factor"),
]


@pytest.mark.parametrize(("text", "internal", "role"), READ)
def test_reads(text: str, internal: float, role: str) -> None:
    read = parse(text)
    assert read.internal == float(f"{internal:.12g}")
    assert read.role.name == role


REFUSED = [
    ("", InputError, "empty text"),
    ("  ", InputError, "empty text"),
    ("long leg", InputError, "'long leg', which is no number with a unit"),
    ("kN", InputError, "which is no number with a unit"),
    ("nan kN", InputError, "which is no number with a unit"),
    ("inf kN", InputError, "which is no number with a unit"),
    ("None", InputError, "which is no number with a unit"),
    ("1,250 mm", InputError, "a comma may stand between thousands or before decimals"),
    ("2,4 m", InputError, "a comma may stand between thousands or before decimals"),
    ("285", UnitError, "'285', a number without a unit"),
    ("3/4", UnitError, "'3/4', a number without a unit"),
    ("1 250 mm", InputError, "not one number and a unit"),
    ("1\u202f250 mm", InputError, "not one number and a unit"),
    ("3 -4 mm", InputError, "not one number and a unit"),
    ("1.5 1/2 in", InputError, "not one number and a unit"),
    ("3/4/5 in", InputError, "not one number and a unit"),
    ("310^6 mm4", InputError, "not one number and a unit"),
    ("--5 mm", InputError, "which is no number with a unit"),
    ("1_000 mm", InputError, "'_000 mm' is not a known unit"),
    ("1/0 in", InputError, "a fraction over zero"),
    ("5'-3\"", InputError, "write feet and inches as one"),
    ("5 KN", InputError, "'KN' is not a known unit. Did you mean 'kN'"),
    ("5 Mpa", InputError, "'Mpa' is not a known unit. Did you mean 'MPa'"),
    ("5 kipp", InputError, "'kipp' is not a known unit. Did you mean 'kip'"),
    ("5 furlong", InputError, "'furlong' is not a known unit"),
    ("5 mm^10", InputError, "is not a known unit"),
    ("5 mm^99999999", InputError, "is not a known unit"),
    ("5 kN/", InputError, "'kN/' is not a known unit"),
    ("5 kN/m·m", InputError, "can be read in two ways"),
    ("5 kN·", InputError, "is not a known unit"),
    ("1e999 N", InputError, "a size beyond all use"),
    ("1e-300 N", InputError, "a size beyond all use"),
    ("1e9999 N", InputError, "a size beyond all use"),
    ("10^999 N", InputError, "a size beyond all use"),
    ("10⁻⁻ N", InputError, "the power of ten cannot be read"),
    ("9" * 5000 + " mm", InputError, "which is no number with a unit"),
    ("٣ mm", InputError, "which is no number with a unit"),
]


@pytest.mark.parametrize(("text", "error", "words"), REFUSED)
def test_refuses(text: str, error: type[TensionlibError], words: str) -> None:
    with pytest.raises(error) as caught:
        parse(text)
    assert words in str(caught.value)
    assert len(str(caught.value)) < 400


def test_refuses_what_is_no_text() -> None:
    with pytest.raises(UnitError, match="got 285; text is due"):
        parse(285)  # type: ignore[arg-type]


@given(st.text(alphabet="0123456789. -+/eExk×·*^²⁶NmMPainft\"'°,()", max_size=20))
def test_any_text_is_read_or_refused_in_our_own_words(text: str) -> None:
    with contextlib.suppress(TensionlibError):
        assert math.isfinite(parse(text).internal)


@pytest.mark.parametrize("view", [METRIC, US])
@given(
    number=st.integers(-99999, 99999),
    place=st.integers(-4, 3),
    role=st.sampled_from([r for r in NAMED_ROLES if not r.is_plain_number]),
)
def test_what_is_printed_reads_back(view: View, number: int, place: int, role: Role) -> None:
    internal = number * 10.0**place * view.unit(role).size
    text = format_value(internal, role, view)
    read = parse(text)
    assert read.role.exponents == role.exponents
    assert read.internal == pytest.approx(internal, rel=1e-11)


# Numbers of at most eight figures in millimetres: their size in any unit of length is exact.
TENTHS_OF_MICRONS = st.integers(1, 99_999_999)


def decimal(number: Fraction) -> str:
    """Write a number whose decimals end, exactly."""
    places = 0
    while number.denominator != 1:
        number *= 10
        places += 1
        assert places < 60
    return f"{number.numerator}e-{places}"


@given(TENTHS_OF_MICRONS)
def test_a_length_is_the_same_number_whichever_metric_unit_it_came_in(n: int) -> None:
    in_mm = Fraction(n, 10_000)
    expected = float(in_mm)
    assert parse(f"{decimal(in_mm)} mm").internal == expected
    assert parse(f"{decimal(in_mm / 10)} cm").internal == expected
    assert parse(f"{decimal(in_mm / 1000)} m").internal == expected
    assert (float(in_mm / 1000) * parse("1 m")).internal == expected
    assert (float(in_mm) * mm).internal == expected
    assert values([float(in_mm / 1000)], "m")[0].internal == expected


@given(st.integers(1, 999_999), st.sampled_from([2, 4, 8, 16, 32, 64]))
def test_inches_and_feet_are_exact(over: int, under: int) -> None:
    expected = float(Fraction(over, under) * Fraction("25.4"))
    expected = float(f"{expected:.12g}")
    assert parse(f"{over}/{under} in").internal == expected
    assert parse(f"{decimal(Fraction(over, under))} in").internal == expected
    assert (Fraction(over, under) * parse("1 in")).internal == expected


@given(st.integers(1, 99_999_999), st.sampled_from(["kip", "lbf", "kN", "MN", "N"]))
def test_a_force_agrees_to_twelve_figures_in_any_unit(n: int, unit: str) -> None:
    newtons = n / 1000
    there = quantity(newtons, parse("1 N").role).internal / parse(f"1 {unit}").internal
    assert parse(f"{there!r} {unit}").internal == pytest.approx(newtons, rel=2e-11)


def test_70_mm_is_exactly_70_however_it_is_written() -> None:
    written = [parse("70 mm"), parse("0.07 m"), parse("7 cm"), 70 * mm, 0.07 * parse("1 m")]
    assert [q.internal for q in written] == [70.0] * 5


def test_what_floats_alone_would_miss() -> None:
    assert 1.001 * 1000.0 != 1001.0
    assert (1.001 * parse("1 m")).internal == 1001.0
    assert 1.001 * parse("1 m") == parse("1001 mm")


def test_values() -> None:
    pitches = values([60, 70.5], "mm")
    assert [str(q) for q in pitches] == ["60 mm", "70.5 mm"]
    assert [q.internal for q in values(np.array([0.07, 0.08]), "m")] == [70.0, 80.0]
    assert values([1], "in", US)[0].internal == 25.4
    assert str(values([1], "in", US)[0]) == "1 in"
    assert values([], "mm") == []


@pytest.mark.parametrize(
    ("numbers", "unit", "error", "words"),
    [
        ([60, "70"], "mm", UnitError, "values: number 2 is '70'"),
        ([60, 70 * mm], "mm", UnitError, "values: number 2 is 70 mm"),
        ([True], "mm", UnitError, "values: number 1 is True"),
        ([math.nan], "mm", InputError, "values: number 1 is nan, which is not finite"),
        ([60, math.inf], "mm", InputError, "values: number 2 is inf, which is not finite"),
        ([60], "mn", InputError, "'mn' is not a known unit"),
    ],
)
def test_values_refuses(
    numbers: list[float], unit: str, error: type[Exception], words: str
) -> None:
    with pytest.raises(error) as caught:
        values(numbers, unit)
    assert words in str(caught.value)


def test_steps_include_both_ends_exactly() -> None:
    pitches = steps("60 mm", "120 mm", "5 mm")
    assert [q.internal for q in pitches] == [60.0 + 5.0 * i for i in range(13)]
    assert all(q.role is LENGTH for q in pitches)


@pytest.mark.parametrize(
    ("first", "last", "step", "internals"),
    [
        ("0.1 mm", "0.5 mm", "0.1 mm", [0.1, 0.2, 0.3, 0.4, 0.5]),
        ("60 mm", "0.075 m", "7 mm", [60.0, 67.0, 74.0]),
        ("60 mm", "60 mm", "5 mm", [60.0]),
        ("70 mm", "60 mm", "-5 mm", [70.0, 65.0, 60.0]),
        ("60 mm", "62 mm", "5 mm", [60.0]),
        ("60 mm", "68 mm", "5 mm", [60.0, 65.0]),
        ("1/2 in", "1 in", "1/8 in", [12.7, 15.875, 19.05, 22.225, 25.4]),
    ],
)
def test_steps_do_not_drift(first: str, last: str, step: str, internals: list[float]) -> None:
    assert [q.internal for q in steps(first, last, step)] == internals


@given(st.integers(0, 3000), st.integers(1, 200), st.integers(1, 500))
def test_steps_count_as_integers_do(first: int, step: int, number: int) -> None:
    """Tenths of a millimetre, which floats cannot hold, and kips, which 12 figures cannot."""
    for unit, size in (("mm", 10), ("kip", 1)):
        ends = [f"{Fraction(n, size)} {unit}" for n in (first, first + number * step, step)]
        texts = steps(*ends)
        quantities = steps(*(parse(end) for end in ends))
        assert len(texts) == len(quantities) == number + 1
        for i in (0, 1, number // 2, number):
            expected = parse(f"{Fraction(first + i * step, size)} {unit}").internal
            assert texts[i].internal == expected
            assert quantities[i].internal == pytest.approx(expected, rel=1e-11)


@pytest.mark.parametrize(
    ("ends", "error", "words"),
    [
        (("60 mm", "120 mm", "0 mm"), InputError, "a step of 0 mm does not lead from"),
        (("60 mm", "120 mm", "-5 mm"), InputError, "a step of -5 mm does not lead from"),
        (("60 mm", "120 kN", "5 mm"), UnitError, "first is a length, last a force, step a length"),
        ((60, "120 mm", "5 mm"), UnitError, "steps: first: got 60; a quantity is due"),
        (("60 mm", "120", "5 mm"), UnitError, "steps: last: got '120', a number without a unit"),
        (("60 mm", "120 mm", "five"), InputError, "steps: step: got 'five'"),
        (("0 mm", "1 m", "0.0001 mm"), InputError, "1000000 at most"),
        ((math.nan * mm, 3 * mm, 1 * mm), InputError, "steps: first: got not a number"),
        ((1 * mm, math.inf * mm, 1 * mm), InputError, "steps: last: got ∞ mm"),
        ((1 * kN, 3 * mm, 1 * mm), UnitError, "first is a force"),
    ],
)
def test_steps_refuses(ends: tuple[str, str, str], error: type[Exception], words: str) -> None:
    with pytest.raises(error) as caught:
        steps(*ends)
    assert words in str(caught.value)
