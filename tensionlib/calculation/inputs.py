"""What a standard's walk is given: numbers it can only pass on, and choices it may branch on."""

from __future__ import annotations

from collections.abc import Hashable, Mapping
from dataclasses import dataclass, field
from typing import Any

from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.symbols import Symbol
from tensionlib.calculation.tables import ThresholdTable
from tensionlib.calculation.working import Working
from tensionlib.errors import DataNotFoundError


@dataclass(frozen=True, slots=True)
class Number:
    """One numeric input in internal units, and who says so."""

    value: Any
    origin: str


@dataclass(frozen=True)
class Inputs:
    """Numbers by name and choices by name.

    A walk reads choices as text and takes numbers only as entries, so that no number can steer
    it but through a condition that is printed. `parts` are inputs of what this is made of, such
    as the steps of a chain of holes, each with a prefix of its own. `words` are printed and never
    branched on: two that differ in words alone are worked out alike.
    """

    choices: Mapping[str, str]
    _numbers: Mapping[str, Number] = field(repr=False)
    tables: Mapping[str, tuple[ThresholdTable, str]] = field(default_factory=dict)
    prefix: str = ""
    parts: Mapping[str, tuple[Inputs, ...]] = field(default_factory=dict)
    words: Mapping[str, str] = field(default_factory=dict)
    _kept: dict[str, Entry] = field(default_factory=dict, repr=False, compare=False)

    @property
    def signature(self) -> Hashable:
        """All of this that a walk writes down: what can steer it, and its words."""
        return (
            self.prefix,
            tuple(self.choices.items()),
            frozenset(self._numbers),
            tuple((name, table.name, row) for name, (table, row) in self.tables.items()),
            tuple((name, tuple(p.signature for p in parts)) for name, parts in self.parts.items()),
            tuple(self.words.items()),
        )

    @property
    def steering(self) -> Hashable:
        """All of this that can steer a walk: choices, which numbers are stated, tables' rows."""
        return (
            self.prefix,
            tuple(self.choices.items()),
            frozenset(self._numbers),
            tuple((name, table.name, row) for name, (table, row) in self.tables.items()),
            tuple((name, tuple(p.steering for p in parts)) for name, parts in self.parts.items()),
        )

    @property
    def own(self) -> Mapping[str, Number]:
        """The numbers of this alone, by name: for merging, never for a walk."""
        return self._numbers

    def numbers(self) -> dict[str, Number]:
        """The numbers by the key each has on a sheet: for filling, never for a walk."""
        found = {self.prefix + name: number for name, number in self._numbers.items()}
        for parts in self.parts.values():
            for part in parts:
                found |= part.numbers()
        return found

    def choice(self, name: str) -> str:
        try:
            return self.choices[name]
        except KeyError:
            raise DataNotFoundError(
                f"choice: {name!r} is not among {sorted(self.choices)}"
            ) from None

    def word(self, name: str) -> str:
        """Words to print, "" where there are none."""
        return self.words.get(name, "")

    def has(self, name: str) -> bool:
        """Whether the number was stated at all: a choice of the user's, not its size."""
        return name in self._numbers

    def read(self, work: Working, name: str, by: Entry, symbol: str | None = None) -> Entry:
        """The table `name` (a material's, chosen outside) read at `by`, as a line of `work`."""
        table, row = self.tables[name]
        return work.upto(table, row, symbol or name, by)

    def take(self, work: Working, name: str, symbol: str | Symbol | None = None) -> Entry:
        """The number `name` as an input line of `work`, under `symbol` (its own name unless given).

        Taken again, it is the same line.
        """
        key = self.prefix + name
        taken = work.input(key)
        if taken is not None:
            return taken
        number = self._numbers[name]
        return work.given_number(symbol or name, number.value, number.origin, key)

    def keep(self, name: str, entry: Entry) -> Entry:
        """Remember a computed line by name, for the parts of the walk that come later."""
        self._kept[name] = entry
        return entry

    def kept(self, name: str) -> Entry | None:
        """The line kept under `name`, or None while there is none."""
        return self._kept.get(name)

    def kept_line(self, name: str) -> Entry:
        """The line kept under `name`, which an earlier part of the walk has written."""
        return self._kept[name]
