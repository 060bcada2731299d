"""Numbers as they are printed."""

import math
from decimal import ROUND_HALF_UP, Decimal

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from tensionlib.quantities import (
    ANGLE,
    AREA,
    COUNT,
    FACTOR,
    FORCE,
    INERTIA,
    LENGTH,
    LINE_FIGURES,
    METRIC,
    MOMENT,
    STRESS,
    SUMMARY_FIGURES,
    US,
    WELD_STRENGTH,
    Role,
    format_number,
    format_utilisation,
    format_value,
    latex_value,
)


def test_figures() -> None:
    assert (LINE_FIGURES, SUMMARY_FIGURES) == (5, 4)


@pytest.mark.parametrize(
    ("x", "figures", "text"),
    [
        (285.0, 5, "285"),
        (285, 5, "285"),
        (0.0, 5, "0"),
        (-0.0, 5, "0"),
        (0.9, 5, "0.9"),
        (1860.25, 5, "1860.3"),  # a half goes away from zero
        (-1860.25, 5, "-1860.3"),
        (2675.45, 5, "2675.5"),  # held as 2675.44999...
        (2675.4499, 5, "2675.4"),
        (12345.4, 5, "12345"),
        (12345.4, 4, "12350"),
        (123456.7, 5, "123460"),
        (123456, 5, "123456"),  # an int stays as it is
        (np.int64(123456), 5, "123456"),
        (99999.4, 5, "99999"),
        (99999.5, 5, "100000"),
        (9999.95, 5, "10000"),
        (0.99999, 5, "0.99999"),
        (0.999996, 5, "1"),
        (100000.0, 5, "100000"),
        (1e22, 5, "10000000000000000000000"),
        (1234567.0, 5, "1234600"),
        (0.00012345678, 5, "0.00012346"),
        (0.000012345678, 5, "0.000012346"),
        (1e-7, 5, "0.0000001"),
        (-1e-7, 5, "-0.0000001"),
        (-12.5, 5, "-12.5"),
        (0.1, 15, "0.1"),
        (math.pi, 12, "3.14159265359"),
        (math.nan, 5, "not a number"),
        (math.inf, 5, "∞"),
        (-math.inf, 5, "-∞"),
        (np.float64(0.25), 5, "0.25"),
    ],
)
def test_format_number(x: float, figures: int, text: str) -> None:
    assert format_number(x, figures) == text


@given(st.floats(allow_nan=False, allow_infinity=False), st.integers(1, 12))
def test_format_number_is_the_number_to_its_figures(x: float, figures: int) -> None:
    text = format_number(x, figures)
    assert "e" not in text
    assert text != "-0"
    assert "." not in text or not text.endswith(("0", "."))
    assert text.lstrip("-") == "0" or len(text.strip("-0.").replace(".", "")) <= figures
    if 1e-250 < abs(x) < 1e250:
        assert float(text) == pytest.approx(x, rel=0.5000001 * 10.0 ** (1 - figures))


@given(st.integers(-(10**9), 10**9), st.integers(-6, 3), st.integers(3, 6))
def test_halves_are_rounded_as_on_paper(digits: int, place: int, figures: int) -> None:
    exact = Decimal(digits).scaleb(place)
    if exact == 0:
        return
    unit = Decimal(1).scaleb(exact.adjusted() - figures + 1)
    expected = (exact / unit).quantize(Decimal(1), ROUND_HALF_UP) * unit
    assert Decimal(format_number(float(exact), figures)) == expected


@pytest.mark.parametrize(
    ("internal", "role", "text", "latex"),
    [
        (285000.0, FORCE, "285 kN", r"285\ \text{kN}"),
        (-12500.0, FORCE, "-12.5 kN", r"\left(-12.5\ \text{kN}\right)"),
        (1860.0, AREA, "1860 mm²", r"1860\ \text{mm}^{2}"),
        (4600.0, LENGTH, "4600 mm", r"4600\ \text{mm}"),
        (0.0004, LENGTH, "0.0004 mm", r"0.0004\ \text{mm}"),
        (12.5e6, MOMENT, "12.5 kN·m", r"12.5\ \text{kN·m}"),
        (12.3e6, INERTIA, "12.3 × 10⁶ mm⁴", r"12.3 \cdot 10^{6}\ \text{mm}^{4}"),
        (
            -12.3e6,
            INERTIA,
            "-12.3 × 10⁶ mm⁴",
            r"\left(-12.3 \cdot 10^{6}\ \text{mm}^{4}\right)",
        ),
        (1200.0, WELD_STRENGTH, "1.2 kN/mm", r"1.2\ \text{kN/mm}"),
        (math.pi / 6, ANGLE, "30 deg", r"30\ \text{deg}"),
        (3.0, COUNT, "3", "3"),
        (123456.0, COUNT, "123456", "123456"),
        (2.5, COUNT, "2.5", "2.5"),
        (0.85, FACTOR, "0.85", "0.85"),
        (-0.85, FACTOR, "-0.85", r"\left(-0.85\right)"),
        (-0.0, FORCE, "0 kN", r"0\ \text{kN}"),
        (math.nan, FORCE, "not a number", r"\text{not a number}"),
        (math.inf, FORCE, "∞ kN", r"\infty\ \text{kN}"),
        (-math.inf, FORCE, "-∞ kN", r"\left(-\infty\ \text{kN}\right)"),
        (math.inf, COUNT, "∞", r"\infty"),
        (math.nan, COUNT, "not a number", r"\text{not a number}"),
    ],
)
def test_values_in_the_metric_view(internal: float, role: Role, text: str, latex: str) -> None:
    assert format_value(internal, role) == text
    assert latex_value(internal, role) == latex


def test_values_in_the_us_view_and_to_other_figures() -> None:
    assert format_value(62 * 4448.2216152605, FORCE, US) == "62 kip"
    assert format_value(19.05, LENGTH, US) == "0.75 in"
    assert latex_value(36 * 6.894757293168, STRESS, US) == r"36\ \text{ksi}"
    assert format_value(123456.7, FORCE, METRIC, 4) == "123.5 kN"
    assert latex_value(123456.7, FORCE, METRIC, SUMMARY_FIGURES) == r"123.5\ \text{kN}"


@pytest.mark.parametrize(
    ("u", "text"),
    [
        (0.87312, "0.873"),
        (0.8725, "0.873"),
        (1.0, "1.000"),
        (math.nextafter(1.0, 2.0), "1.001"),
        (1.0000001, "1.001"),
        (1.00049, "1.001"),
        (1.0006, "1.001"),
        (1.0016, "1.002"),
        (math.nextafter(1.0, 0.0), "1.000"),
        (0.9996, "1.000"),
        (0.9994, "0.999"),
        (0.0, "0.000"),
        (-0.0, "0.000"),
        (1e-9, "0.001"),
        (0.0004, "0.001"),
        (-1e-9, "-0.001"),
        (12.3456, "12.346"),
        (123456.7, "123460"),
        (math.nan, "not a number"),
        (math.inf, "∞"),
    ],
)
def test_format_utilisation(u: float, text: str) -> None:
    assert format_utilisation(u) == text


@given(st.floats(0, 100))
def test_a_printed_utilisation_never_contradicts_the_verdict(u: float) -> None:
    printed = float(format_utilisation(u))
    assert (printed > 1) == (u > 1)
    assert (printed == 0) == (u == 0)
    assert abs(printed - u) <= 0.001
