"""Rules of a study: fields that follow others, so that an alternative stays one that is drilled."""

from __future__ import annotations

import math
from functools import partial
from typing import Any

from tensionlib.errors import InputError
from tensionlib.joints.room import CLEARANCE, socket_outside, washer_outside
from tensionlib.quantities import LENGTH, Quantity, door, factor, quantity
from tensionlib.steel import Section, bolt
from tensionlib.steel.bolts import CLASSES, SIZES
from tensionlib.whatif.fields import Rule

_HAIR = 1e-9


def _rounded(value: float, step: float) -> Any:
    return quantity(math.ceil(value / step - _HAIR) * step, LENGTH)


def _step(up_to: Quantity | str) -> float:
    return float(door("up_to", up_to, LENGTH, above=0.0, example="5 mm").internal)


def _diameters(times: float, step: float, bolts: str) -> Any:
    return _rounded(times * bolt(bolts).d_f, step)


def per_bolt(times: float, up_to: Quantity | str = "5 mm") -> Rule:
    """A length of so many bolt diameters, rounded up: a pitch of 3.5, an end distance of 2.

    Raises
    ------
    InputError, UnitError
        For a number or step that is not above zero.
    """
    times = factor("times", times, above=0.0)
    step = _step(up_to)
    return Rule(("bolts",), partial(_diameters, times, step), f"{times:g} bolt diameters")


def _clear(step: float, section: Section, bolts: str) -> Any:
    d = section.dims
    size = bolt(bolts).size
    washer = washer_outside(size) / 2 + d["t"] + d.get("r1", 0.0)
    socket = socket_outside(size) / 2 + CLEARANCE + d["t"]
    return _rounded(max(washer, socket), step)


def clear_of_heel(up_to: Quantity | str = "5 mm") -> Rule:
    """The least gauge of an angle at which washer and socket are clear of the other leg.

    By the room for nut and wrench that a calculation advises: common practice, no source.
    """
    return Rule(("section", "bolts"), partial(_clear, _step(up_to)), "clear of the other leg")


def _middle(step: float, section: Section, to: str) -> Any:
    return _rounded(section.leg("long leg" if to == "leg" else to) / 2, step)


def middle_of_leg(up_to: Quantity | str = "5 mm") -> Rule:
    """A gauge in the middle of the connected leg, rounded up."""
    return Rule(("section", "end.to"), partial(_middle, _step(up_to)), "middle of the leg")


def bolt_sizes(grade: str = "8.8/S", *, least: str = "M12", most: str = "M36") -> list[str]:
    """Designations of all bolt sizes of a class and category, smallest first: "M16 8.8/S" …

    Raises
    ------
    InputError, DataNotFoundError
        For a size, class or category not on offer.
    """
    for name, value in (("least", least), ("most", most)):
        if value not in SIZES:
            raise InputError(f"{name}: got {value!r}; one of {', '.join(SIZES)} is due")
    if not isinstance(grade, str) or grade.partition("/")[0] not in CLASSES:
        raise InputError(f"grade: got {grade!r}; for example '8.8/S' or '4.6/S'")
    low, high = SIZES[least].d_f, SIZES[most].d_f
    return [bolt(f"{n} {grade}").designation for n, s in SIZES.items() if low <= s.d_f <= high]


def follows(*reads: str, by: Any, words: str = "a rule of the user's") -> Rule:
    """A rule of one's own: `by` of the values of these fields gives the field's value.

    A section comes as a `Section`, a length as a quantity, bolts as their designation.
    """
    return Rule(tuple(reads), by, words)
