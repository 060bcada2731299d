"""The working: where a calculation is written, line by line."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from contextlib import contextmanager
from typing import Any

from tensionlib.calculation.formula import Condition, Formula
from tensionlib.calculation.sheet import (
    CheckKind,
    CheckLine,
    Entry,
    Extreme,
    Fixed,
    Given,
    Holds,
    Line,
    NotCovered,
    Note,
    Sheet,
    Step,
    Upto,
)
from tensionlib.calculation.symbols import Notation, Symbol
from tensionlib.calculation.tables import ThresholdTable
from tensionlib.errors import InputError
from tensionlib.quantities import Quantity, Role, door


def _same_kind(entry: Role, due: Role) -> bool:
    """Whether an entry may stand for a parameter: same role, or same real dimension."""
    if entry is due:
        return True
    dimension = (entry.force, entry.length, entry.mass)
    return dimension == (due.force, due.length, due.mass) and dimension != (0, 0, 0)


class Working:
    """A calculation in the making.

    Each method adds a line and gives back its `Entry`, which later lines take. Use it for formulas
    of your own::

        work = tl.Working("Wind on the east panel", notation)
        p = work.given("p", "0.92 kPa")
        N = work.step(brace_force, p, ...)
        tl.design(brace, N, standard="NZS 3404")

    Parameters
    ----------
    part : str
        Title of the first part.
    notation : Notation
        Where symbols named by a plain string are looked up.
    """

    def __init__(self, part: str, notation: Notation) -> None:
        self.notation = notation
        self.lines: list[Line] = []
        self.values: list[Any] = []
        self.origins: dict[int, str] = {}
        self.assumptions: list[str] = []
        self.not_checked: list[str] = []
        self._keys: dict[str, int] = {}
        self._checks: set[tuple[str, str]] = set()
        self._part = part

    def fork(self, notation: Notation) -> Working:
        """A working that goes on from here in another notation and leaves this one as it is."""
        other = Working(self._part, notation)
        other.lines = list(self.lines)
        other.values = list(self.values)
        other.origins = dict(self.origins)
        other.assumptions = list(self.assumptions)
        other.not_checked = list(self.not_checked)
        other._keys = dict(self._keys)
        other._checks = set(self._checks)
        return other

    def adopt(self, entry: Entry) -> Entry:
        """The same line of the working this one was forked from, as an entry of this one."""
        if entry.index >= len(self.lines) or self.lines[entry.index].symbol is not entry.symbol:
            raise InputError(f"{entry.symbol.text}: this entry belongs to another working")
        return Entry(self, entry.index, entry.symbol)

    def sheet(self) -> Sheet:
        return Sheet(tuple(self.lines))

    # Lines --------------------------------------------------------------------------------

    def given(
        self,
        symbol: str | Symbol,
        value: Quantity | str | float,
        origin: str = "given",
        *,
        key: str = "",
    ) -> Entry:
        """An input.

        Parameters
        ----------
        symbol : str or Symbol
        value : quantity or text with a unit; a plain number for a count or a factor
        origin : str
            Who says so: "schedule row 3", "150x90x10 UA", "given".
        key : str
            Name under which an array fill puts its values; the symbol's name unless given.

        Raises
        ------
        UnitError, InputError
            As `quantities.door`; also for a key that stands twice.
        """
        symbol = self._symbol(symbol)
        number = float(door(symbol.text, value, symbol.role).internal)
        return self.given_number(symbol, number, origin, key or symbol.name)

    def given_number(self, symbol: str | Symbol, number: Any, origin: str, key: str) -> Entry:
        """An input that has passed the door: a float in internal units, from the layers below."""
        if key in self._keys:
            raise InputError(f"input {key!r} stands twice; give one of them a key of its own")
        self._keys[key] = len(self.lines)
        symbol = self._symbol(symbol)
        self.origins[len(self.lines)] = origin
        line = Given(part=self._part, symbol=symbol, title=symbol.meaning, key=key)
        return self._add(line, number)

    def input(self, key: str) -> Entry | None:
        """The input line of this key, or None while there is none."""
        index = self._keys.get(key)
        if index is None:
            return None
        symbol = self.lines[index].symbol
        assert symbol is not None
        return Entry(self, index, symbol)

    def step(
        self,
        formula: Formula,
        *args: Entry,
        gives: str | Symbol | None = None,
        title: str = "",
        clause: str | None = None,
        note: str = "",
    ) -> Entry:
        """A formula on entries.

        Raises
        ------
        InputError
            For a wrong number of entries, an entry of another working, or one whose role is not
            the parameter's ("t is a length, got f_u, a stress").
        """
        indices = self._indices(formula.name, formula.parameters, args)
        for due, entry in zip(formula.symbols, args, strict=True):
            if entry.symbol.role is not due.role and not _same_kind(entry.symbol.role, due.role):
                raise InputError(
                    f"{formula.name}: {due.text} is a {due.role.name},"
                    f" got {entry.symbol.text}, a {entry.symbol.role.name}"
                )
        symbol = formula.gives if gives is None else self._symbol(gives)
        line = Step(
            part=self._part,
            symbol=symbol,
            title=title or formula.title,
            clause=self.notation.cite(formula.clause if clause is None else clause),
            note=note,
            formula=formula,
            args=indices,
        )
        return self._add(line)

    def fixed(
        self,
        symbol: str | Symbol,
        value: float,
        clause: str,
        *,
        title: str = "",
        note: str = "",
        source: str = "",
    ) -> Entry:
        """A number picked from a clause's table by a choice; `note` says which row."""
        symbol = self._symbol(symbol)
        line = Fixed(
            part=self._part,
            symbol=symbol,
            title=title or symbol.meaning,
            clause=self.notation.cite(clause),
            note=note,
            value=float(value),
            source=self.notation.cite(source),
        )
        return self._add(line)

    def upto(
        self,
        table: ThresholdTable,
        row: str,
        symbol: str | Symbol,
        by: Entry,
        *,
        clause: str = "",
        title: str = "",
    ) -> Entry:
        """A table read by a threshold; the line prints the band that held and its source."""
        symbol = self._symbol(symbol)
        (index,) = self._indices(table.name, ("by",), (by,))
        line = Upto(
            part=self._part,
            symbol=symbol,
            title=title or symbol.meaning,
            clause=self.notation.cite(clause),
            table=table,
            row=row,
            by=index,
            source=self.notation.cite(table.source),
        )
        return self._add(line)

    def least(self, symbol: str | Symbol, *args: Entry, title: str, clause: str = "") -> Entry:
        """The least of several entries; the line prints them all and names the one that ruled."""
        return self._extreme(symbol, args, title, clause, least=True)

    def greatest(self, symbol: str | Symbol, *args: Entry, title: str, clause: str = "") -> Entry:
        """The greatest of several entries, likewise."""
        return self._extreme(symbol, args, title, clause, least=False)

    def holds(
        self, condition: Condition, *args: Entry, yes: str = "", no: str = "", clause: str = ""
    ) -> bool:
        """Test a condition and say which way the work goes: the only way numbers may steer it.

        `yes` and `no` say in a few words what follows from either answer.
        """
        indices = self._indices(condition.function.__name__, condition.parameters, args)
        decision = bool(condition.function(*[self.values[index] for index in indices]))
        line = Holds(
            part=self._part,
            title=condition.title,
            clause=self.notation.cite(clause or condition.clause),
            condition=condition,
            args=indices,
            decision=decision,
            consequence=yes if decision else no,
        )
        self._append(line, decision)
        return decision

    def check(
        self,
        name: str,
        demand: Entry,
        capacity: Entry,
        clause: str,
        *,
        kind: CheckKind = "strength",
        note: str = "",
    ) -> None:
        """Demand against capacity, of one role.

        For a lower limit give what is required as the demand and what is provided as the
        capacity. Checks are named by part and name; the same pair twice is refused.
        """
        if not _same_kind(demand.symbol.role, capacity.symbol.role):
            raise InputError(
                f"check {name}: demand {demand.symbol.text} is a {demand.symbol.role.name},"
                f" capacity {capacity.symbol.text} a {capacity.symbol.role.name}"
            )
        if (self._part, name) in self._checks:
            raise InputError(f"check {name!r} stands twice in part {self._part!r}")
        self._checks.add((self._part, name))
        first, second = self._indices(name, ("demand", "capacity"), (demand, capacity))
        line = CheckLine(
            part=self._part,
            title=name,
            clause=self.notation.cite(clause),
            note=note,
            demand=first,
            capacity=second,
            kind=kind,
        )
        self._append(line, line.evaluate(self.values))

    def note(self, text: str, clause: str = "") -> None:
        """Words between the lines."""
        self._append(Note(part=self._part, title=text, clause=self.notation.cite(clause)), None)

    def not_covered(self, name: str, why: str, clause: str) -> None:
        """A check that is not offered: the verdict of the whole becomes "not covered"."""
        clause = self.notation.cite(clause)
        self._append(NotCovered(part=self._part, title=name, clause=clause, note=why), None)

    def assume(self, text: str) -> None:
        """An assumption, listed once at the end of the calculation."""
        if text not in self.assumptions:
            self.assumptions.append(text)

    def leaves_out(self, *texts: str) -> None:
        """What this calculation does not check, listed so that silence is not read as a pass."""
        self.not_checked.extend(text for text in texts if text not in self.not_checked)

    @contextmanager
    def part(self, title: str) -> Iterator[None]:
        """Lines added inside stand under this title."""
        before, self._part = self._part, title
        try:
            yield
        finally:
            self._part = before

    # Helpers ------------------------------------------------------------------------------

    def _symbol(self, symbol: str | Symbol) -> Symbol:
        return self.notation[symbol] if isinstance(symbol, str) else symbol

    def _indices(self, what: str, names: Sequence[str], args: Sequence[Entry]) -> tuple[int, ...]:
        if len(args) != len(names):
            raise InputError(
                f"{what}: got {len(args)} entries; {len(names)} are due: {', '.join(names)}"
            )
        try:
            if all([entry.owner is self for entry in args]):
                return tuple([entry.index for entry in args])
        except AttributeError:
            for name, entry in zip(names, args, strict=True):
                if not isinstance(entry, Entry):
                    raise InputError(
                        f"{what}: {name} got {entry!r}; an entry is due, as given(...) or"
                        " step(...) hand back"
                    ) from None
        other = next(entry for entry in args if entry.owner is not self)
        raise InputError(f"{what}: {other.symbol.text} belongs to another working")

    def _extreme(
        self, symbol: str | Symbol, args: tuple[Entry, ...], title: str, clause: str, *, least: bool
    ) -> Entry:
        symbol = self._symbol(symbol)
        if not args:
            raise InputError(f"{symbol.text}: the least or greatest of nothing; give entries")
        for entry in args:
            if not _same_kind(entry.symbol.role, symbol.role):
                raise InputError(
                    f"{symbol.text} is a {symbol.role.name},"
                    f" got {entry.symbol.text}, a {entry.symbol.role.name}"
                )
        indices = self._indices(symbol.text, [entry.symbol.text for entry in args], args)
        line = Extreme(
            part=self._part,
            symbol=symbol,
            title=title,
            clause=self.notation.cite(clause),
            args=indices,
            least=least,
        )
        return self._add(line)

    def _add(self, line: Line, value: Any = None) -> Entry:
        index = len(self.lines)
        self._append(line, line.evaluate(self.values) if value is None else value)
        assert line.symbol is not None
        return Entry(self, index, line.symbol)

    def _append(self, line: Line, value: Any) -> None:
        self.lines.append(line)
        self.values.append(value)
