"""The door: what a user gives is a quantity of the right kind here, or it is refused."""

from __future__ import annotations

import math
from numbers import Integral, Real
from typing import Any

from forallpeople import Physical

from tensionlib.errors import InputError, UnitError
from tensionlib.quantities.formatting import format_number, text_in
from tensionlib.quantities.parsing import parse_exact
from tensionlib.quantities.quantity import Quantity, from_physical
from tensionlib.quantities.roles import Role
from tensionlib.quantities.views import METRIC

_EXAMPLES = {
    "length": "'4600 mm' or 4.6*m",
    "area": "'1860 mm2'",
    "volume": "'52000 mm3'",
    "section modulus": "'52000 mm3'",
    "inertia": "'12.3e6 mm4'",
    "force": "'285 kN' or 285*kN",
    "moment": "'12 kN·m'",
    "stress": "'440 MPa' or 440*MPa",
    "elastic modulus": "'200 GPa'",
    "pressure": "'0.5 kPa'",
    "force per length": "'6.3 kN/m'",
    "weight per length": "'6.3 kN/m'",
    "weld strength": "'1.2 kN/mm'",
    "weight density": "'77 kN/m3'",
    "mass": "'120 kg'",
    "mass per length": "'14.6 kg/m'",
    "density": "'7850 kg/m3'",
    "angle": "'30 deg' or 30*deg",
}


def door(
    argument: str,
    value: Any,
    role: Role,
    *,
    above: float | None = None,
    at_least: float | None = None,
    at_most: float | None = None,
    example: str | None = None,
) -> Quantity:
    """Take a quantity, a forallpeople value or text, and give it as a Quantity of the role.

    Where the role is a count, a factor or a code, a bare number is what is due.

    Parameters
    ----------
    argument : str
        The name the user knows the value by; every message begins with it.
    value : Quantity, forallpeople Physical or str
    role : Role
        The kind that is due; its dimension is what is compared.
    above, at_least, at_most : float, optional
        Limits, in internal units (N, mm, MPa, rad, kg).
    example : str, optional
        What a message offers as an example, in place of the role's own.

    Raises
    ------
    UnitError
        A bare number, another dimension, or something that is no single quantity.
    InputError
        NaN, infinity, a number outside the limits, or text that cannot be read.
    """
    if value.__class__ is Quantity and value.role is role:
        got = value
    else:
        got = _taken(argument, value, role, example)
    x = got.internal
    if x - x != 0:
        raise InputError(f"{argument}: got {_shown(value)}; a finite number is due")
    if above is not None and not x > above:
        raise _outside(argument, got, "above", above)
    if at_least is not None and not x >= at_least:
        raise _outside(argument, got, "at least", at_least)
    if at_most is not None and not x <= at_most:
        raise _outside(argument, got, "at most", at_most)
    return got


def _taken(argument: str, value: Any, role: Role, example: str | None) -> Quantity:
    read: Quantity | None = None
    if isinstance(value, str):
        read = _read(argument, value, role, example)
    elif isinstance(value, Physical):
        read = from_physical(value)
        if read is None:
            raise UnitError(
                f"{argument}: got {_shown(value)}, which is not {role.phrase}; "
                f"{_due(role, example)}"
            )
    elif role.is_plain_number:
        number = count(argument, value, 0) if role.whole else factor(argument, value)
        return Quantity(number, role)
    if read is None:
        raise UnitError(_refusal(argument, value, role, example))
    given = read.role
    if given.exponents != role.exponents or given.is_plain_number != role.is_plain_number:
        raise UnitError(f"{argument}: got {_shown(value)}, {given.phrase}; {_due(role, example)}")
    if given == role:
        return read
    # A unit that the user chose by `to` stays; otherwise the role has its own.
    chosen = read.unit if read.unit != read.view.unit(given) else None
    return Quantity(read.full, role, read.view, chosen)


def _read(argument: str, text: str, role: Role, example: str | None) -> Quantity:
    try:
        exact, given = parse_exact(text, _example(role, example))
    except (InputError, UnitError) as error:
        raise type(error)(f"{argument}: {error}") from None
    return Quantity(float(exact), given)


def _refusal(argument: str, value: object, role: Role, example: str | None) -> str:
    if value is None:
        return f"{argument}: got nothing (None); {_due(role, example)}"
    if isinstance(value, bool):
        return f"{argument}: got {value}; {_due(role, example)}"
    if isinstance(value, Real):
        return (
            f"{argument}: got {value}, a bare number; give {role.phrase} with its unit, "
            f"for example {_example(role, example)}"
        )
    if hasattr(value, "__len__") or hasattr(value, "__iter__"):
        return (
            f"{argument}: got several values ({type(value).__name__}); one is due, "
            f"for example {_example(role, example)}"
        )
    return f"{argument}: got {_shown(value)}; {_due(role, example)}"


def _due(role: Role, example: str | None) -> str:
    return f"{role.phrase} is due, for example {_example(role, example)}"


def _example(role: Role, example: str | None) -> str:
    if example is not None:
        return example if example.startswith("'") else f"'{example}'"
    if role.is_plain_number:
        return "3" if role.whole else "0.85"
    return _EXAMPLES.get(role.name) or f"'1 {METRIC.unit(role).name}'"


def _shown(value: object) -> str:
    text = str(value) if isinstance(value, Physical) else repr(value)
    return text if len(text) <= 60 else text[:57] + "..."


def _outside(argument: str, got: Quantity, relation: str, limit: float) -> InputError:
    for figures in (5, 8, 12):
        text = text_in(got.internal, got.unit, got.role, figures)
        bound = text_in(limit, got.unit, got.role, figures)
        if text != bound or got.internal == limit:
            break
    return InputError(f"{argument}: got {text}; it must be {relation} {bound}")


def count(argument: str, value: Any, at_least: int = 1, at_most: int | None = None) -> int:
    """Take a whole number.

    Raises UnitError for anything with a unit, text or a bool, and InputError for a number that is
    not whole or lies outside the limits.
    """
    if value.__class__ is Quantity and value.role.is_plain_number:
        value = value.internal
    if isinstance(value, bool) or not isinstance(value, Real):
        raise UnitError(f"{argument}: got {_shown(value)}; a whole number is due, for example 3")
    if isinstance(value, Integral):
        whole = int(value)
    elif float(value).is_integer():
        whole = int(float(value))
    else:
        raise InputError(f"{argument}: got {value}; a whole number is due, for example 3")
    if whole < at_least:
        raise InputError(f"{argument}: got {whole}; it must be at least {at_least}")
    if at_most is not None and whole > at_most:
        raise InputError(f"{argument}: got {whole}; it must be at most {at_most}")
    return whole


def factor(
    argument: str,
    value: Any,
    *,
    above: float | None = None,
    at_least: float | None = None,
    at_most: float | None = None,
) -> float:
    """Take a plain number without a unit.

    Raises UnitError for anything with a unit, text or a bool, and InputError for NaN, infinity or
    a number outside the limits.
    """
    if value.__class__ is Quantity and value.role.is_plain_number:
        value = value.internal
    if isinstance(value, bool) or not isinstance(value, Real):
        raise UnitError(
            f"{argument}: got {_shown(value)}; a plain number without a unit is due, "
            "for example 0.85"
        )
    x = float(value)
    if not math.isfinite(x):
        raise InputError(f"{argument}: got {x}; a finite number is due")
    for relation, limit, kept in (
        ("above", above, above is None or x > above),
        ("at least", at_least, at_least is None or x >= at_least),
        ("at most", at_most, at_most is None or x <= at_most),
    ):
        if not kept and limit is not None:
            raise InputError(
                f"{argument}: got {format_number(x, 12)}; "
                f"it must be {relation} {format_number(limit, 12)}"
            )
    return x
