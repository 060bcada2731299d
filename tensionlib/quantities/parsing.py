"""Reading quantities from text: "285 kN", "3/4 in", "12.3 × 10⁶ mm⁴"; and lists of quantities."""

from __future__ import annotations

import math
import re
from collections.abc import Iterable
from fractions import Fraction
from numbers import Real

from forallpeople import Physical

from tensionlib.errors import InputError, UnitError
from tensionlib.quantities.quantity import Quantity, from_physical
from tensionlib.quantities.roles import Role
from tensionlib.quantities.unitnames import read_unit
from tensionlib.quantities.views import METRIC, View

_TEN_TO = r"10(?:\^(?P<power>[-+]?\d{1,3})|(?P<raised>[⁰¹²³⁴⁵⁶⁷⁸⁹⁻]{1,4}))(?![\d⁰¹²³⁴⁵⁶⁷⁸⁹])"
_NUMBER = re.compile(
    r"(?P<sign>[-+]?) ?"
    r"(?:(?:(?P<whole>\d+)[ -])?(?P<over>\d+) ?/ ?(?P<under>\d+)"
    r"|(?P<decimal>(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d{1,3})?))"
    rf" ?(?:[x×*·]? ?{_TEN_TO})? ?",
    re.ASCII,
)
_POWER_OF_TEN = re.compile(rf"(?P<sign>[-+]?) ?{_TEN_TO} ?", re.ASCII)
_RAISED = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
# Typographer's signs and their plain ones.
_PLAIN = str.maketrans(
    {
        "\N{MINUS SIGN}": "-",
        "\N{PRIME}": "'",
        "\N{DOUBLE PRIME}": '"',
        "\N{RIGHT DOUBLE QUOTATION MARK}": '"',
        "½": " 1/2",
        "¼": " 1/4",
        "¾": " 3/4",
        "⅛": " 1/8",
        "⅜": " 3/8",
        "⅝": " 5/8",
        "⅞": " 7/8",
    }
)
_EXAMPLE = "'285 kN', '12.5 mm' or '3/4 in'"
_LONGEST = 100
_MOST_STEPS = 1_000_000


def parse(text: str, view: View = METRIC) -> Quantity:
    """Read a quantity from text: a number or a fraction, then a unit.

    Raises InputError for text that is no quantity, a comma, or an unknown unit (with the nearest
    names), and UnitError for a number without a unit.
    """
    exact, role = parse_exact(text)
    return Quantity(float(exact), role, view)


def parse_exact(text: str, example: str = _EXAMPLE) -> tuple[Fraction, Role]:
    """Read a quantity from text as an exact number of internal units, with its role."""
    if not isinstance(text, str):
        raise UnitError(f"got {text!r}; text is due, for example {example}")
    shown = repr(text if len(text) <= 60 else text[:57] + "...")
    plain = " ".join(text.translate(_PLAIN).split())
    if not plain:
        raise InputError(f"got an empty text; give a number and its unit, for example {example}")
    if "," in plain:
        raise InputError(
            f"got {shown}: a comma may stand between thousands or before decimals; "
            "write '1250' without it, and '2.4' with a point"
        )
    found = _POWER_OF_TEN.match(plain) or _NUMBER.match(plain)
    if found is None or len(plain) > _LONGEST:
        raise InputError(f"got {shown}, which is no number with a unit, such as {example}")
    number = _number(found, shown)
    rest = plain[found.end() :]
    if not rest:
        raise UnitError(f"got {shown}, a number without a unit; give its unit, as in {example}")
    if rest[0].isdigit() or rest[0] in "./+-^":
        raise InputError(f"got {shown}, which is not one number and a unit, such as {example}")
    if rest[0] == "'" and rest[1:].strip():
        raise InputError(f"got {shown}: write feet and inches as one, '5.25 ft' or '63 in'")
    try:
        unit = read_unit(rest)
    except InputError as error:
        raise InputError(f"got {shown}: {error}") from None
    return number * Fraction(unit.size), unit.role


def _number(found: re.Match[str], shown: str) -> Fraction:
    parts = found.groupdict()
    if parts.get("over"):
        if not int(parts["under"]):
            raise InputError(f"got {shown}, a fraction over zero")
        number = Fraction(int(parts["over"]), int(parts["under"]))
        if parts["whole"]:
            number += int(parts["whole"])
    else:
        number = Fraction(parts.get("decimal") or "1")
    power = parts["power"] or parts["raised"]
    if power:
        try:
            number *= Fraction(10) ** int(power.translate(_RAISED))
        except ValueError:
            raise InputError(f"got {shown}, in which the power of ten cannot be read") from None
    if number and not 1e-200 < abs(number) < 1e200:
        raise InputError(f"got {shown}, a size beyond all use")
    return -number if parts["sign"] == "-" else number


def values(numbers: Iterable[float], unit: str, view: View = METRIC) -> list[Quantity]:
    """Give one quantity for each number: ``values([60, 70], "mm")``.

    Raises InputError for an unknown unit or a number that is not finite, and UnitError for
    anything that is not a bare number.
    """
    read = read_unit(unit)
    size = Fraction(read.size)
    made: list[Quantity] = []
    for place, number in enumerate(numbers, start=1):
        if isinstance(number, bool) or not isinstance(number, Real):
            raise UnitError(
                f"values: number {place} is {number!r}; bare numbers are due, all in {unit!r}"
            )
        if not math.isfinite(number):
            raise InputError(f"values: number {place} is {number}, which is not finite")
        made.append(Quantity(float(_exact(float(number)) * size), read.role, view))
    return made


def steps(
    first: str | Physical, last: str | Physical, step: str | Physical, view: View = METRIC
) -> list[Quantity]:
    """Give quantities from `first` to `last`, both included: ``steps("60 mm", "120 mm", "5 mm")``.

    Each is reckoned from the ends, so nothing drifts. Where `last` is no whole number of steps
    away, the list ends before it. Raises InputError for a step of zero or one that leads away from
    `last`, and UnitError for bare numbers or unlike dimensions.
    """
    start, role = _end("first", first)
    end, end_role = _end("last", last)
    stride, step_role = _end("step", step)
    if not role.exponents == end_role.exponents == step_role.exponents:
        raise UnitError(
            f"steps: first is {role.phrase}, last {end_role.phrase}, step {step_role.phrase}; "
            "all three must be of one kind"
        )
    if stride == 0 or (end - start) / stride < 0:
        raise InputError(f"steps: a step of {step} does not lead from {first} to {last}")
    ratio = (end - start) / stride
    number = round(ratio)
    if number > _MOST_STEPS:
        raise InputError(f"steps: a step of {step} gives {number} values; {_MOST_STEPS} at most")
    # Quantities carry 12 figures, so a whole number of steps may miss by as little.
    if number and abs(ratio - number) < Fraction(1, 10**6):
        stride = (end - start) / number
    else:
        number = math.floor(ratio)
    return [Quantity(float(start + i * stride), role, view) for i in range(number + 1)]


def _end(argument: str, value: object) -> tuple[Fraction, Role]:
    if isinstance(value, str):
        try:
            return parse_exact(value)
        except (InputError, UnitError) as error:
            raise type(error)(f"steps: {argument}: {error}") from None
    read = from_physical(value) if isinstance(value, Physical) else None
    if read is None:
        raise UnitError(f"steps: {argument}: got {value!r}; a quantity is due, such as '60 mm'")
    if not math.isfinite(read.internal):
        raise InputError(f"steps: {argument}: got {read}, which is not finite")
    return _exact(read.internal), read.role


def _exact(number: float) -> Fraction:
    """Give the decimal number that was meant: 0.1 is a tenth, not its nearest binary one."""
    return Fraction(repr(number))
