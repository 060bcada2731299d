"""The units that can be named, their sizes, and reading a compound unit such as "kN/m" or "mm²"."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from fractions import Fraction
from functools import lru_cache

from tensionlib.errors import InputError, did_you_mean
from tensionlib.quantities.roles import (
    ANGLE,
    FORCE,
    LENGTH,
    MASS,
    PRESSURE,
    STRESS,
    Role,
    role_of,
    unit_latex,
    unit_text,
)

# Exact by definition: the inch, the pound, and the standard acceleration in the pound-force.
_INCH = Fraction("25.4")
_FOOT = 12 * _INCH
_POUND = Fraction("0.45359237")
_POUND_FORCE = _POUND * Fraction("9.80665")

# Name: how many internal units (N, mm, kg, rad) are in one, and what it measures.
UNITS: dict[str, tuple[Fraction, Role]] = {
    "mm": (Fraction(1), LENGTH),
    "cm": (Fraction(10), LENGTH),
    "m": (Fraction(1000), LENGTH),
    "in": (_INCH, LENGTH),
    "ft": (_FOOT, LENGTH),
    "N": (Fraction(1), FORCE),
    "kN": (Fraction(1000), FORCE),
    "MN": (Fraction(10**6), FORCE),
    "lbf": (_POUND_FORCE, FORCE),
    "kip": (1000 * _POUND_FORCE, FORCE),
    "Pa": (Fraction(1, 10**6), PRESSURE),
    "kPa": (Fraction(1, 1000), PRESSURE),
    "MPa": (Fraction(1), STRESS),
    "GPa": (Fraction(1000), STRESS),
    "psi": (_POUND_FORCE / _INCH**2, STRESS),
    "ksi": (1000 * _POUND_FORCE / _INCH**2, STRESS),
    "psf": (_POUND_FORCE / _FOOT**2, PRESSURE),
    "ksf": (1000 * _POUND_FORCE / _FOOT**2, PRESSURE),
    "kg": (Fraction(1), MASS),
    "t": (Fraction(1000), MASS),
    "lb": (_POUND, MASS),
    "rad": (Fraction(1), ANGLE),
    "deg": (Fraction(math.pi / 180), ANGLE),
}

_ALIASES: dict[str, str] = {
    "inch": "in",
    "inches": "in",
    "in.": "in",
    '"': "in",
    "'": "ft",
    "ft.": "ft",
    "feet": "ft",
    "foot": "ft",
    "kips": "kip",
    "°": "deg",
    "degree": "deg",
    "degrees": "deg",
    "tonne": "t",
    "tonnes": "t",
}

# Written without a sign between: a force, then a length.
_RUN_TOGETHER: dict[str, tuple[str, str]] = {
    force + length: (force, length)
    for force in ("N", "kN", "MN", "kip", "lbf")
    for length in ("mm", "m", "in", "ft")
}

_SUPERSCRIPTS = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
_FACTOR = re.compile(r"([A-Za-z]+\.?|[\"'°])(\^?\(?(-?\d(?:\.\d{1,6})?)\)?)?", re.ASCII)
# What a misspelt unit is compared with.
_KNOWN = (*UNITS, "kNm", "kipin", "N/mm2", "kN/m", "kg/m", "lb/ft")


@dataclass(frozen=True, slots=True)
class NamedUnit:
    """A unit that was read: its parts, the internal units in one of it, and what it measures."""

    parts: tuple[tuple[str, float], ...]
    size: Fraction | float
    role: Role

    @property
    def text(self) -> str:
        """The unit as it is printed: "kN/m", "mm²"."""
        return unit_text(self.parts)

    @property
    def latex(self) -> str:
        """The unit as LaTeX."""
        return unit_latex(self.parts)


@lru_cache(maxsize=1024)
def read_unit(text: str) -> NamedUnit:
    """Read the name of a unit: "mm2", "mm²", "kN/m", "kN·m", "kNm", "kip-in", "N/mm^2".

    Raises InputError with the nearest names when the unit is not known.
    """
    parts: list[tuple[str, float]] = []
    for place, side in enumerate(text.translate(_SUPERSCRIPTS).split("/")):
        here = _read_product(side.strip(), text)
        if place and len(here) > 1:
            raise InputError(
                f"the unit {text!r} can be read in two ways: put one unit only after each '/', "
                "for example 'kN/m' or 'kN/mm2'"
            )
        parts += [(symbol, -power if place else power) for symbol, power in here]
    size: Fraction | float = Fraction(1)
    exponents = [0.0, 0.0, 0.0]
    for symbol, power in parts:
        one, role = UNITS[symbol]
        size = size * (one ** int(power) if power == int(power) else float(one) ** power)
        for axis, exponent in enumerate(role.exponents):
            exponents[axis] += exponent * power
    single = len(parts) == 1 and parts[0][1] == 1
    role = UNITS[parts[0][0]][1] if single else role_of((exponents[0], exponents[1], exponents[2]))
    return NamedUnit(tuple(parts), size, role)


def _read_product(side: str, text: str) -> list[tuple[str, float]]:
    parts: list[tuple[str, float]] = []
    place = 0
    while True:
        found = _FACTOR.match(side, place)
        if found is None:
            raise unknown_unit(text)
        name, power_written = found.group(1), found.group(3)
        power = float(power_written) if power_written else 1.0
        if name not in _ALIASES and name not in UNITS and name.endswith("."):
            # A full stop that joins two units, as in "kN.m".
            name = name[:-1]
            place = found.end() - 1
        else:
            place = found.end()
        name = _ALIASES.get(name, name)
        if name in UNITS:
            parts.append((name, power))
        elif name in _RUN_TOGETHER and power == 1:
            parts += [(one, 1.0) for one in _RUN_TOGETHER[name]]
        else:
            raise unknown_unit(text)
        rest = side[place:].lstrip()
        if not rest:
            return parts
        if rest[0] in "·*.-×⋅":
            rest = rest[1:].lstrip()
        elif not side[place].isspace():
            raise unknown_unit(text)
        place = len(side) - len(rest)


def unknown_unit(text: str) -> InputError:
    """Build the error for a unit that is not known."""
    near = did_you_mean(text, _KNOWN)
    if not near:
        near = " Known units are " + ", ".join(UNITS) + ", their powers, products and quotients."
    return InputError(f"{text!r} is not a known unit.{near}")
