"""A number with its role and its display unit, as a kind of forallpeople Physical."""

from __future__ import annotations

from collections.abc import Callable
from numbers import Real
from typing import Any

from forallpeople import Physical
from forallpeople.dimensions import Dimensions

from tensionlib.errors import InputError, UnitError
from tensionlib.quantities.formatting import LINE_FIGURES, latex_in, text_in
from tensionlib.quantities.roles import Exponents, Role, role_of
from tensionlib.quantities.views import METRIC, DisplayUnit, View, display_unit

_DIMENSIONS: dict[Exponents, Dimensions] = {}
_EXPONENTS: dict[Dimensions, Exponents | None] = {}


def snap(x: float) -> float:
    """Round to 12 significant figures, so that 0.07 m and 70 mm are the same number inside."""
    return float(f"{x:.12g}")


def exponents_of(dimensions: Dimensions) -> Exponents | None:
    """Give the powers of (force, length, mass) of a forallpeople dimension.

    None when it holds time that is not part of a force, or amperes, kelvins and the like.
    """
    try:
        return _EXPONENTS[dimensions]
    except KeyError:
        kg, m, s, *others = dimensions
        force = -s / 2
        mass, length = kg - force, m - force
        # Time comes only inside a force (kg·m/s2): half a force may be a root of one, but beside a
        # mass it is a time by itself, as in m/s.
        foreign = any(others) or (force != int(force) and mass != 0)
        found = None if foreign else (float(force), float(length), float(mass))
        _EXPONENTS[dimensions] = found
        return found


def dimensions_of(exponents: Exponents) -> Dimensions:
    """Give the forallpeople dimension of powers of (force, length, mass)."""
    try:
        return _DIMENSIONS[exponents]
    except KeyError:
        force, length, mass = exponents
        made = Dimensions(
            *(int(x) if x == int(x) else x for x in (force + mass, force + length, -2 * force)),
            *(0, 0, 0, 0),
        )
        _DIMENSIONS[exponents] = made
        return made


def _per_si(length: float) -> tuple[float, bool]:
    """Give the factor between metres and millimetres to a power, and whether to multiply by it."""
    return 1000.0 ** abs(length), length >= 0


def internal_of(value: float, exponents: Exponents) -> float:
    """Turn a number of SI units (as forallpeople keeps it) into one of N, mm and kg."""
    scale, multiply = _per_si(exponents[1])
    return value * scale if multiply else value / scale


class Quantity(Physical):
    """A number in N, mm, MPa, rad or kg inside, printed in one fixed unit.

    Arithmetic with quantities, forallpeople values and plain numbers gives a Quantity again, whose
    role follows from its dimension, or a float where no dimension is left. Adding a bare number or
    comparing unlike dimensions raises UnitError. It cannot be changed once made.
    """

    # `internal` is the number to 12 figures, which is printed, compared and calculated with.
    # Products go on with `full`, the number as it was reckoned, or 30*deg would be off in the
    # twelfth figure; sums go on with `internal`, or 1001*mm - 1.001*m would not be 0 mm.
    __slots__ = ("full", "internal", "role", "unit", "view")

    full: float
    internal: float
    role: Role
    view: View
    unit: DisplayUnit

    def __init__(
        self, internal: float, role: Role, view: View = METRIC, unit: DisplayUnit | None = None
    ) -> None:
        full = float(internal)
        snapped = snap(full)
        scale, multiply = _per_si(role.length)
        _set_value(self, snapped / scale if multiply else snapped * scale)
        _set_dimensions(self, dimensions_of(role.exponents))
        _set_factor(self, 1)
        _set_precision(self, 3)
        _set_prefixed(self, "")
        _set_full(self, full)
        _set_internal(self, snapped)
        _set_role(self, role)
        _set_view(self, view)
        _set_unit(self, view.unit(role) if unit is None else unit)

    def __setattr__(self, name: str, value: object) -> None:
        raise AttributeError("a quantity cannot be changed; make another one")

    def __delattr__(self, name: str) -> None:
        raise AttributeError("a quantity cannot be changed")

    def __reduce__(self) -> tuple[type[Quantity], tuple[float, Role, View, DisplayUnit]]:
        return (Quantity, (self.full, self.role, self.view, self.unit))

    def __copy__(self) -> Quantity:
        return self

    def __deepcopy__(self, memo: dict[int, Any]) -> Quantity:
        return self

    # Display

    def to(self, unit_name: str = "") -> Quantity:
        """Give the same quantity shown in another unit: ``force.to("kip")``.

        Raises InputError with the nearest names for an unknown unit, and UnitError for a unit of
        another dimension.
        """
        return Quantity(self.full, self.role, self.view, self._unit_named(unit_name))

    def value_in(self, unit_name: str) -> float:
        """Give the bare number of a unit: ``force.value_in("kN")``; exact to ten figures.

        Raises as `to` does.
        """
        return float(f"{self.internal / self._unit_named(unit_name).size:.10g}")

    def _unit_named(self, unit_name: str) -> DisplayUnit:
        unit, measured = display_unit(unit_name)
        if (
            measured.exponents != self.role.exponents
            or measured.is_plain_number != self.role.is_plain_number
        ):
            raise UnitError(
                f"{self} is {self.role.phrase}; {unit_name!r} is a unit of {measured.name}"
            )
        return unit

    def __str__(self) -> str:
        return text_in(self.internal, self.unit, self.role, LINE_FIGURES)

    __repr__ = __str__

    @property
    def latex(self) -> str:
        """The quantity as LaTeX, without dollar signs."""
        return latex_in(self.internal, self.unit, self.role, LINE_FIGURES)

    @property
    def html(self) -> str:
        """The quantity as HTML; its text needs no markup."""
        return str(self)

    def _repr_latex_(self) -> str:
        return f"${self.latex}$"

    def _repr_html_(self) -> str:
        return str(self)

    def _repr_markdown_(self) -> str:
        return str(self)

    def __format__(self, format_spec: str = "") -> str:
        # handcalcs asks for ".3fL"; the number of figures is ours, whatever it asks for.
        if format_spec.endswith("L$"):
            return self._repr_latex_()
        if format_spec.endswith("L"):
            return self.latex
        if format_spec in ("", "H"):
            return str(self)
        return format(self.internal / self.unit.size, format_spec) + self.unit.text_suffix

    # Numbers

    def __float__(self) -> float:
        if self.role.dimensionless:
            return self.internal
        raise UnitError(
            f"{self} is {self.role.phrase}, not a plain number; "
            f"take the number of a unit, for example .value_in({self.unit.name!r})"
        )

    def __int__(self) -> int:
        return int(float(self))

    def __hash__(self) -> int:
        # Equal quantities share it. A forallpeople value that compares equal need not: there,
        # values a shade apart are equal too, which no hash can follow.
        if self.role.is_plain_number:
            return hash(self.internal)
        return hash((self.internal, self.dimensions))

    def __neg__(self) -> Any:
        return self._like(-self.full)

    def __pos__(self) -> Any:
        return self

    def __abs__(self) -> Any:
        return self._like(abs(self.full))

    def __round__(self, n: int | None = None) -> Any:
        """Round the number of the unit it is shown in."""
        return self._like(round(self.internal / self.unit.size, n or 0) * self.unit.size)

    def sqrt(self, n: float = 2) -> Any:
        """Give the square root, or another root."""
        return self ** (1 / n)

    def split(self, base_value: bool = True) -> tuple[float, Any]:
        """Give the number and one of its unit: SI units, or those it is shown in."""
        if base_value:
            return (self.value, Physical(1, self.dimensions, 1))
        return (self.internal / self.unit.size, self._like(self.unit.size))

    def _like(self, full: float) -> Any:
        if self.role.is_plain_number:
            return full
        return Quantity(full, self.role, self.view, self.unit)

    def _made(self, full: float, force: float, length: float, mass: float) -> Any:
        if not (force or length or mass):
            return full
        return Quantity(full, role_of((force, length, mass)), self.view)

    # Comparison

    def __eq__(self, other: object) -> bool:
        if not isinstance(other, Real | Physical):
            return NotImplemented
        there = self._same_kind(other)
        return there is not None and self.internal == there

    def __lt__(self, other: object) -> bool:
        if not isinstance(other, Real | Physical):
            return NotImplemented
        return self.internal < self._comparable(other)

    def __le__(self, other: object) -> bool:
        if not isinstance(other, Real | Physical):
            return NotImplemented
        return self.internal <= self._comparable(other)

    def __gt__(self, other: object) -> bool:
        if not isinstance(other, Real | Physical):
            return NotImplemented
        return self.internal > self._comparable(other)

    def __ge__(self, other: object) -> bool:
        if not isinstance(other, Real | Physical):
            return NotImplemented
        return self.internal >= self._comparable(other)

    def _same_kind(self, other: object) -> float | None:
        """Give the internal number of a value of the same dimension, or None."""
        if isinstance(other, Quantity):
            if (
                other.role.exponents == self.role.exponents
                and other.role.is_plain_number == self.role.is_plain_number
            ):
                return other.internal
        elif isinstance(other, Physical):
            exponents = exponents_of(other.dimensions)
            if exponents is not None and exponents == self.role.exponents:
                return snap(internal_of(other.value, exponents))
        elif isinstance(other, Real) and self.role.is_plain_number:
            return float(other)
        return None

    def _comparable(self, other: object) -> float:
        there = self._same_kind(other)
        if there is None:
            raise UnitError(f"cannot compare {self._told()} with {_told(other)}")
        return there

    def _told(self) -> str:
        return f"{self}, {self.role.phrase},"

    # Arithmetic

    def _addable(self, other: object, doing: str) -> float:
        there = self._same_kind(other)
        if there is None:
            raise UnitError(f"cannot {doing} {self._told()} and {_told(other)}")
        return there

    def __add__(self, other: object) -> Any:
        if not isinstance(other, Real | Physical):
            return NotImplemented
        return self._like(self.internal + self._addable(other, "add"))

    def __radd__(self, other: object) -> Any:
        # sum() begins with a bare 0, which is nothing in any unit.
        if other.__class__ is int and other == 0:
            return self
        return self.__add__(other)

    __iadd__ = __add__

    def __sub__(self, other: object) -> Any:
        if not isinstance(other, Real | Physical):
            return NotImplemented
        return self._like(self.internal - self._addable(other, "subtract"))

    def __rsub__(self, other: object) -> Any:
        if not isinstance(other, Real | Physical):
            return NotImplemented
        return self._like(self._addable(other, "subtract") - self.internal)

    __isub__ = __sub__

    def __mul__(self, other: Any) -> Any:
        if isinstance(other, Real):
            return self._like(self.full * float(other))
        if isinstance(other, Quantity):
            a, b = self.role, other.role
            return self._made(
                self.full * other.full,
                a.force + b.force,
                a.length + b.length,
                a.mass + b.mass,
            )
        return self._with_physical(other, lambda here, there: here * there)

    __rmul__ = __mul__
    __imul__ = __mul__

    def __truediv__(self, other: Any) -> Any:
        if isinstance(other, Real):
            return self._like(self.full / float(other))
        if isinstance(other, Quantity):
            a, b = self.role, other.role
            return self._made(
                self.full / other.full,
                a.force - b.force,
                a.length - b.length,
                a.mass - b.mass,
            )
        return self._with_physical(other, lambda here, there: here / there)

    __itruediv__ = __truediv__

    def __rtruediv__(self, other: Any) -> Any:
        if isinstance(other, Real):
            role = self.role
            return self._made(float(other) / self.full, -role.force, -role.length, -role.mass)
        return self._with_physical(other, lambda here, there: there / here)

    def __pow__(self, other: Any) -> Any:
        if not isinstance(other, Real):
            raise UnitError(f"cannot raise {self._told()} to the power {_told(other)}")
        power = float(other)
        if self.internal < 0 and not power.is_integer():
            raise InputError(f"cannot take a root of {self._told()} which is negative")
        exponents = (_tidy(exponent * power) for exponent in self.role.exponents)
        return self._made(self.full**power, *exponents)

    def _with_physical(self, other: Any, work: Callable[[Any, Any], Any]) -> Any:
        """Multiply or divide with a forallpeople value; a dimension of another world stays its."""
        if not isinstance(other, Physical):
            return NotImplemented
        exponents = exponents_of(other.dimensions)
        if exponents is None:
            made = work(self.si(), other)
            back = exponents_of(made.dimensions) if isinstance(made, Physical) else None
            if back is None:
                return made
            return Quantity(internal_of(made.value, back), role_of(back), self.view)
        there = Quantity(internal_of(other.value, exponents), role_of(exponents), self.view)
        return work(self, there)


def _tidy(exponent: float) -> float:
    """Bring a power that is a twelfth but for rounding to that twelfth: (mm^(1/3))^3 is mm."""
    twelfths = round(12 * exponent)
    return twelfths / 12 if abs(12 * exponent - twelfths) < 1e-9 else exponent


_set_value = Physical.value.__set__
_set_dimensions = Physical.dimensions.__set__
_set_factor = Physical.factor.__set__
_set_precision = Physical.precision.__set__
_set_prefixed = Physical.prefixed.__set__
_set_full = Quantity.__dict__["full"].__set__
_set_internal = Quantity.__dict__["internal"].__set__
_set_role = Quantity.__dict__["role"].__set__
_set_view = Quantity.__dict__["view"].__set__
_set_unit = Quantity.__dict__["unit"].__set__


def _told(other: object) -> str:
    if isinstance(other, Quantity):
        return f"{other}, {other.role.phrase}"
    if isinstance(other, Real):
        return f"{other}, a bare number: give it a unit"
    return repr(other)


def quantity(internal: float, role: Role, view: View = METRIC) -> Quantity:
    """Make a Quantity from a number of internal units (N, mm, MPa, rad, kg)."""
    return Quantity(internal, role, view)


def from_physical(value: Any, view: View = METRIC) -> Quantity | None:
    """Make a Quantity from a forallpeople value; None where its dimension is none of ours."""
    if isinstance(value, Quantity):
        return value
    exponents = exponents_of(value.dimensions)
    if exponents is None:
        return None
    return Quantity(internal_of(value.value, exponents), role_of(exponents), view)
