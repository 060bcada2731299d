"""Sheets already written: one that fits is filled again, and only a new case is walked.

A walk can be steered by choices, by which numbers are stated, and by tested conditions, and by
nothing else; so a sheet written once serves every member of the same choices whose conditions
turn out the same way.
"""

from __future__ import annotations

from collections import OrderedDict
from collections.abc import Hashable
from dataclasses import dataclass
from typing import Any

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.calculation.sheet import Given, Sheet
from tensionlib.calculation.working import Working
from tensionlib.errors import TensionlibError
from tensionlib.standards import Standard

FORCE_PART = "Design force"
FORCE_KEY = "N_star"
_MOST_CASES = 512


@dataclass(frozen=True, slots=True)
class Case:
    """What a member puts to a standard: the standard, the design force, the member, its ends."""

    standard: Standard
    force: Number
    member: Inputs
    ends: tuple[Inputs, ...]

    @property
    def key(self) -> Hashable:
        """All that can steer the walk before it has tested a condition."""
        return (
            self.standard.key,
            self.standard.edition,
            self.member.signature,
            tuple(end.signature for end in self.ends),
        )

    def numbers(self) -> dict[str, Number]:
        """Every number by its key on the sheet."""
        found = {FORCE_KEY: self.force}
        for inputs in (self.member, *self.ends):
            found |= inputs.numbers()
        return found


@dataclass(frozen=True, slots=True)
class Written:
    """A sheet with what its walk said beside the lines."""

    sheet: Sheet
    assumptions: tuple[str, ...]
    not_checked: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Filling:
    """A written sheet with the values and origins of one member."""

    written: Written
    values: tuple[Any, ...]
    origins: dict[int, str]


_BOOK: OrderedDict[Hashable, tuple[Written, ...]] = OrderedDict()


def fill(case: Case) -> Filling:
    """The case's sheet, filled. Raises what the walk raises."""
    numbers = case.numbers()
    key = case.key
    for written in _BOOK.get(key, ()):
        values = _values(written.sheet, numbers)
        if values is not None:
            return _filling(written, values, numbers)
    work = Working(FORCE_PART, case.standard.notation)
    N_star = work.given_number("N_star", case.force.value, case.force.origin, FORCE_KEY)
    case.standard.design(work, case.member, case.ends, N_star)
    written = Written(work.sheet(), tuple(work.assumptions), tuple(work.not_checked))
    _BOOK[key] = (*_BOOK.get(key, ()), written)
    if len(_BOOK) > _MOST_CASES:
        _BOOK.popitem(last=False)
    return _filling(written, tuple(work.values), numbers)


def _values(sheet: Sheet, numbers: dict[str, Number]) -> tuple[Any, ...] | None:
    """The values of a sheet, or None where the member does not follow it."""
    inputs = {key: numbers[key].value for key in sheet.keys}
    try:
        values = sheet.evaluate(inputs)
    except TensionlibError:
        # A table that ends before this member: the walk says so in its own words.
        return None
    return values if all([values[i] is decision for i, decision in sheet.decisions]) else None


def _filling(written: Written, values: tuple[Any, ...], numbers: dict[str, Number]) -> Filling:
    origins = {
        i: numbers[line.key].origin
        for i, line in enumerate(written.sheet.lines)
        if isinstance(line, Given)
    }
    return Filling(written, values, origins)
