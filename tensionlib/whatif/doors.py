"""The door of one field of a brief, alone: what a study's lists are passed through."""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.inputs import Number
from tensionlib.errors import InputError
from tensionlib.joints.stated import Stated
from tensionlib.members.brief import Brief
from tensionlib.quantities import FORCE, LENGTH, door
from tensionlib.standards import Standard
from tensionlib.standards import standard as find_standard
from tensionlib.steel import Grade, Section, grade, section


def through_door(base: Brief, name: str, value: Any) -> Any:
    """A value as the field holds it. Raises what the field raises, naming it."""
    if name in _DOORS:
        return _DOORS[name](name, value)
    above, _, field = name.rpartition(".")
    holder = base.value(above) if above else None
    if isinstance(holder, Stated) and field in holder.DOORS:
        return holder.DOORS[field](name, value)
    return value


def _force(name: str, value: Any) -> Any:
    return door(name, value, FORCE, at_least=0.0, example="285 kN")


def _service(name: str, value: Any) -> Any:
    if value is None or isinstance(value, Number):
        return value
    return Number(door(name, value, FORCE, at_least=0.0, example="150 kN").internal, "given")


def _standard(name: str, value: Any) -> Standard:
    return value if isinstance(value, Standard) else find_standard(value)


def _section(name: str, value: Any) -> Section:
    if isinstance(value, str):
        return section(value)
    if not isinstance(value, Section):
        raise InputError(f"{name}: got {value!r}; a designation is due, as '150x90x10 UA'")
    return value


def _steel(name: str, value: Any) -> Grade:
    if isinstance(value, str):
        return grade(value)
    if not isinstance(value, Grade):
        raise InputError(f"{name}: got {value!r}; a grade is due, as 'AS/NZS 3679.1 300'")
    return value


def _length(name: str, value: Any) -> Any:
    return door(name, value, LENGTH, above=0.0, example="4600 mm")


def _ties(name: str, value: Any) -> Any:
    return None if value is None else door(name, value, LENGTH, above=0.0, example="1500 mm")


_DOORS = {
    "force": _force,
    "service": _service,
    "standard": _standard,
    "section": _section,
    "steel": _steel,
    "length": _length,
    "ties": _ties,
}
