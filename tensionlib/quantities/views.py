"""Which unit each role is shown in: fixed, never prefixed by size."""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass, field
from functools import lru_cache

from tensionlib.errors import InputError, UnitError, did_you_mean
from tensionlib.quantities.roles import (
    NAMED_ROLES,
    Exponents,
    Role,
    power_text,
    role_of,
    unit_latex,
    unit_text,
)
from tensionlib.quantities.unitnames import UNITS, read_unit

_SCALED = re.compile(r"10(?:\^(?P<power>\d{1,2})|(?P<raised>[⁰¹²³⁴⁵⁶⁷⁸⁹]{1,2})) (?P<unit>.+)")
_TO_ASCII = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻·", "0123456789-.")


@dataclass(frozen=True, slots=True)
class DisplayUnit:
    """A unit to print in: its name, its LaTeX, and how many internal units are in one."""

    name: str
    latex: str
    size: float
    text_suffix: str = field(init=False, repr=False, compare=False)
    latex_suffix: str = field(init=False, repr=False, compare=False)

    def __post_init__(self) -> None:
        # A unit that begins with a number ("10⁶ mm⁴") is multiplied, not merely set beside.
        times = self.name[:1].isdigit()
        text = f" × {self.name}" if times else f" {self.name}"
        latex = rf" \cdot {self.latex}" if times else rf"\ {self.latex}"
        object.__setattr__(self, "text_suffix", text if self.name else "")
        object.__setattr__(self, "latex_suffix", latex if self.name else "")

    @property
    def ascii(self) -> str:
        """The name in plain characters, for records and tables of data: "mm2", "kN.m"."""
        scale, space, unit = self.name.rpartition(" ")
        return scale.replace("10", "10^").translate(_TO_ASCII) + space + unit.translate(_TO_ASCII)


PLAIN = DisplayUnit("", "", 1.0)


@lru_cache(maxsize=1024)
def display_unit(text: str) -> tuple[DisplayUnit, Role]:
    """Read the name of a unit to print in, and the role it measures.

    "10^6 mm4" and "10³ mm³" are units too. Raises InputError with the nearest names
    for one that is not known.
    """
    scaled = _SCALED.fullmatch(text)
    if scaled is None:
        read = read_unit(text)
        return DisplayUnit(read.text, read.latex, float(read.size)), read.role
    read = read_unit(scaled["unit"])
    power = int((scaled["power"] or scaled["raised"]).translate(_TO_ASCII))
    name = f"10{power_text(power)} {read.text}"
    latex = rf"10^{{{power}}}\ {read.latex}"
    return DisplayUnit(name, latex, float(read.size * 10**power)), read.role


class View:
    """A fixed display unit for each role. `but` gives a view with some units changed."""

    __slots__ = ("_base", "_composed", "_units", "name")

    name: str
    _units: dict[Role, DisplayUnit]
    _composed: dict[Exponents, DisplayUnit]
    _base: tuple[str, str, str]

    def __init__(self, name: str, base: tuple[str, str, str], units: Mapping[str, str]) -> None:
        """Take the base units of (force, length, mass) and a unit for each role by its name."""
        chosen = {role: PLAIN for role in NAMED_ROLES if role.is_plain_number}
        for role_name, unit_name in units.items():
            role = _role_named(role_name)
            chosen[role] = _checked(role, unit_name)
        object.__setattr__(self, "name", name)
        object.__setattr__(self, "_base", base)
        object.__setattr__(self, "_units", chosen)
        object.__setattr__(self, "_composed", {})

    def unit(self, role: Role) -> DisplayUnit:
        """Give the display unit of a role; one without gets a unit composed from the base."""
        try:
            return self._units[role]
        except KeyError:
            return self._unit_of_dimension(role.exponents)

    def _unit_of_dimension(self, exponents: Exponents) -> DisplayUnit:
        known = self._units.get(role_of(exponents))
        if known is not None:
            return known
        unit = self._composed.get(exponents)
        if unit is None:
            unit = self._composed[exponents] = _compose(self._base, exponents)
        return unit

    def but(self, **units: str) -> View:
        """Give a view with other units for the named roles: ``METRIC.but(length="m")``.

        A role of two words takes an underscore: ``force_per_length="kN/mm"``. Raises InputError
        for an unknown role or unit and UnitError for a unit of another dimension.
        """
        named = {_role_named(name).name: unit for name, unit in units.items()}
        kept = {role.name: unit.name for role, unit in self._units.items() if unit is not PLAIN}
        changes = ", ".join(f"{name} in {unit}" for name, unit in named.items())
        return View(f"{self.name}, {changes}" if changes else self.name, self._base, kept | named)

    def __setattr__(self, name: str, value: object) -> None:
        raise AttributeError(f"a view cannot be changed; use view.but({name}=...) for another one")

    def __delattr__(self, name: str) -> None:
        raise AttributeError("a view cannot be changed")

    def __eq__(self, other: object) -> bool:
        if not isinstance(other, View):
            return NotImplemented
        return self is other or (self._base, self._units) == (other._base, other._units)

    def __hash__(self) -> int:
        return hash((self._base, frozenset(self._units.items())))

    def __repr__(self) -> str:
        return f"View({self.name!r})"

    def __reduce__(self) -> tuple[type[View], tuple[str, tuple[str, str, str], dict[str, str]]]:
        kept = {role.name: unit.name for role, unit in self._units.items() if unit is not PLAIN}
        return (View, (self.name, self._base, kept))


def _role_named(name: str) -> Role:
    wanted = name.replace("_", " ")
    for role in NAMED_ROLES:
        if role.name == wanted and not role.is_plain_number:
            return role
    with_units = [role.name for role in NAMED_ROLES if not role.is_plain_number]
    near = did_you_mean(wanted, with_units) or f" Known ones: {', '.join(with_units)}."
    raise InputError(f"{name!r} is no role that has a unit.{near}")


def _checked(role: Role, unit_name: str) -> DisplayUnit:
    unit, measured = display_unit(unit_name)
    same_dimension = measured.exponents == role.exponents
    if not same_dimension or (role.is_plain_number != measured.is_plain_number):
        raise UnitError(f"{role.name}: {unit_name!r} is a unit of {measured.name}, not {role.name}")
    return unit


def _compose(base: tuple[str, str, str], exponents: Exponents) -> DisplayUnit:
    parts = tuple((symbol, power) for symbol, power in zip(base, exponents, strict=True) if power)
    size = 1.0
    for symbol, power in parts:
        size *= float(UNITS[symbol][0]) ** power
    return DisplayUnit(unit_text(parts), unit_latex(parts), size)


METRIC = View(
    "metric",
    ("N", "mm", "kg"),
    {
        "length": "mm",
        "area": "mm²",
        "volume": "mm³",
        "section modulus": "mm³",
        "inertia": "10⁶ mm⁴",
        "force": "kN",
        "moment": "kN·m",
        "stress": "MPa",
        "elastic modulus": "MPa",
        "pressure": "kPa",
        "force per length": "kN/m",
        "weight per length": "kN/m",
        "weld strength": "kN/mm",
        "weight density": "kN/m³",
        "mass": "kg",
        "mass per length": "kg/m",
        "density": "kg/m³",
        "angle": "deg",
    },
)

US = View(
    "US",
    ("kip", "in", "lb"),
    {
        "length": "in",
        "area": "in²",
        "volume": "in³",
        "section modulus": "in³",
        "inertia": "in⁴",
        "force": "kip",
        "moment": "kip·in",
        "stress": "ksi",
        "elastic modulus": "ksi",
        "pressure": "psf",
        "force per length": "kip/in",
        "weight per length": "kip/ft",
        "weld strength": "kip/in",
        "weight density": "kip/ft³",
        "mass": "lb",
        "mass per length": "lb/ft",
        "density": "lb/ft³",
        "angle": "deg",
    },
)
