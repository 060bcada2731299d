"""What the classes a user states share: their fields pass the door here."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import fields
from typing import Any, ClassVar, cast

from tensionlib.errors import InputError, did_you_mean
from tensionlib.quantities import LENGTH, Quantity, door, factor

Length = Quantity | str

THREADS = ("in shear plane", "out of shear plane")
EDGES = ("sheared", "machine cut", "rolled")
QUALITIES = ("SP", "GP")


def in_mm(length: Any) -> float:
    """A length field of an end, which the door has made a quantity, in mm; 0 where left out."""
    return 0.0 if length is None else float(length.internal)


def choice(argument: str, value: object, accepted: tuple[str, ...]) -> str:
    """A field of an end that takes one of a few words. Raises InputError naming those."""
    if not isinstance(value, str) or value not in accepted:
        raise InputError(
            f"{argument}: got {value!r}; one of {', '.join(map(repr, accepted))} is due."
            + (did_you_mean(value, accepted) if isinstance(value, str) else "")
        )
    return value


Door = Callable[[str, Any], Any]
"""Takes a field's name and value; gives the value as it is held, or raises naming the field."""


def length_door(example: str, *, at_least: float | None = None, due: bool = False) -> Door:
    """The door of a length above 0, or of one `at_least` mm; None passes unless it is `due`."""

    def take(name: str, value: Any) -> Any:
        if value is None and not due:
            return None
        above = 0.0 if at_least is None else None
        return door(name, value, LENGTH, above=above, at_least=at_least, example=example)

    return take


def word_door(accepted: tuple[str, ...]) -> Door:
    """The door of a word that is one of a few."""
    return lambda name, value: choice(name, value, accepted)


def named_door(example: str, ask: str = "name it") -> Door:
    """The door of a text that names something held elsewhere."""

    def take(name: str, value: Any) -> str:
        if not isinstance(value, str):
            raise InputError(f"{name}: got {value!r}; {ask}, for example {example!r}")
        return value

    return take


def factor_door(**limits: float) -> Door:
    """The door of a pure number within limits; None passes."""
    return lambda name, value: None if value is None else factor(name, value, **limits)


def reason_given(end: Any) -> None:
    """Refuse a stated k_te without the reason that is printed with it."""
    reason = end.k_te_reason
    if end.k_te is not None and (not isinstance(reason, str) or not reason.strip()):
        raise InputError("k_te_reason: missing; a stated k_te needs the reason that is printed")


class Stated:
    """Passes the fields of a frozen dataclass through the door."""

    DOORS: ClassVar[Mapping[str, Door]] = {}
    """The door of each field that stands alone."""

    def _pass_doors(self) -> None:
        for name, take in self.DOORS.items():
            object.__setattr__(self, name, take(name, getattr(self, name)))

    def _length(
        self, name: str, *, example: str, at_least: float | None = None, due: bool = False
    ) -> None:
        """Take a field as a length; None is accepted unless it is `due`."""
        value = getattr(self, name)
        if value is None and not due:
            return
        above = 0.0 if at_least is None else None
        quantity = door(
            name, value, LENGTH, above=above, at_least=at_least, example=example or None
        )
        object.__setattr__(self, name, quantity)

    def _shear_planes(self) -> None:
        """Packing and slip factor of a bolted end."""
        self._length("packing", example="8 mm")
        mu = factor("slip_factor", vars(self)["slip_factor"], above=0.0, at_most=1.0)
        object.__setattr__(self, "slip_factor", mu)

    def _factor(self) -> None:
        """A stated k_te, which needs the reason that is printed with it."""
        stated = vars(self)["k_te"]
        if stated is not None:
            object.__setattr__(self, "k_te", factor("k_te", stated, above=0.0, at_most=1.0))
        reason_given(self)

    def but(self, **changes: Any) -> Any:
        """A copy with some fields changed.

        Raises
        ------
        InputError
            For a name that is not a field.
        """
        names = [f.name for f in fields(cast(Any, self))]
        for name in changes:
            if name not in names:
                raise InputError(
                    f"{type(self).__name__}: {name!r} is not a field; fields are"
                    f" {', '.join(names)}." + did_you_mean(name, names)
                )
        return type(self)(**{name: getattr(self, name) for name in names} | changes)
