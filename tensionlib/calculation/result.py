"""A calculation: a sheet filled once, with its checks and its readings."""

from __future__ import annotations

import hashlib
import json
import math
from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from functools import cached_property
from typing import TYPE_CHECKING, Any

from tensionlib.calculation.sheet import (
    CheckKind,
    CheckLine,
    Extreme,
    Given,
    Line,
    NotCovered,
    Sheet,
    Step,
    passes,
)
from tensionlib.calculation.symbols import Source
from tensionlib.calculation.working import Working
from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.quantities import FORCE, METRIC, Quantity, View, format_utilisation, quantity

if TYPE_CHECKING:
    from tensionlib.calculation.readings.detailing import DetailingReport


@dataclass(frozen=True, slots=True)
class Check:
    """One check of a filled calculation.

    `utilisation` is demand over capacity: 0 for no demand, infinite for a capacity of zero or
    less, NaN when a number is missing. `verdict` is "pass", "fail", "no demand", or "advice".
    """

    part: str
    name: str
    clause: str
    kind: CheckKind
    demand: Quantity
    capacity: Quantity
    utilisation: float
    note: str

    @property
    def passes(self) -> bool:
        """Whether the check holds. A NaN does not pass."""
        return bool(passes(self.utilisation))

    @property
    def verdict(self) -> str:
        if not self.passes:
            return "advice" if self.kind == "advice" else "fail"
        if self.demand.internal == 0.0:
            return "no demand"
        return "pass"

    def __repr__(self) -> str:
        return (
            f"{self.part}, {self.name} ({self.clause}): {self.demand} on {self.capacity},"
            f" utilisation {format_utilisation(self.utilisation)}, {self.verdict}"
        )


@dataclass(frozen=True, slots=True)
class Sketch:
    """A drawing of a calculation: title, SVG text, and the words for who cannot see it."""

    title: str
    svg: str
    alt: str


@dataclass(frozen=True, slots=True)
class Heading:
    """What a calculation is about.

    `subject` names the section and grade in words; `force` is the index of the line that holds
    the design force, or None for a working without one.
    """

    mark: str
    title: str
    subject: str
    standard: Source | None = None
    standard_key: str = ""
    force: int | None = None


@dataclass(frozen=True)
class Calculation:
    """A sheet filled once. Shown in a notebook, it reads as a full calculation.

    ``calc["net rupture"]`` or ``calc["Gusset", "yield"]`` is a `Check`, ``calc.value("A_n")`` a
    quantity, ``calc.capacity`` the largest design force every strength check allows.
    """

    sheet: Sheet
    values: tuple[Any, ...]
    heading: Heading
    origins: dict[int, str]
    assumptions: tuple[str, ...] = ()
    not_checked: tuple[str, ...] = ()
    sources: tuple[tuple[Source, str], ...] = ()
    draw: Callable[[], tuple[Sketch, ...]] | None = None
    view: View = METRIC
    version: str = ""
    brief: Any = None
    """What was asked, as the layers above state it; None for a working of the user's own."""

    @classmethod
    def of(cls, work: Working, heading: Heading, **more: Any) -> Calculation:
        """The calculation that a working has become."""
        from tensionlib.version import __version__

        return cls(
            sheet=work.sheet(),
            values=tuple(work.values),
            heading=heading,
            origins=dict(work.origins),
            assumptions=tuple(work.assumptions),
            not_checked=tuple(work.not_checked),
            version=__version__,
            **more,
        )

    # Values and checks --------------------------------------------------------------------

    @cached_property
    def checks(self) -> tuple[Check, ...]:
        return tuple(self._check(i, line) for i, line in self._lines(CheckLine))

    @property
    def governing(self) -> Check | None:
        """The check that decides: the strength check of greatest utilisation.

        When all strength checks pass and a detailing limit is broken, that limit decides.
        """
        strength = [check for check in self.checks if check.kind == "strength"]
        worst = max(strength, key=_severity, default=None)
        if worst is None or worst.passes:
            broken = [c for c in self.checks if c.kind == "detailing" and not c.passes]
            return max(broken, key=_severity, default=worst)
        return worst

    @property
    def not_covered(self) -> tuple[NotCovered, ...]:
        """The checks the standard or the library does not offer for this case."""
        return tuple(line for line in self.sheet.lines if isinstance(line, NotCovered))

    @property
    def passes(self) -> bool:
        """Whether every strength and detailing check passes and nothing is "not covered"."""
        return self.word == "PASS"

    @property
    def word(self) -> str:
        """The verdict: "PASS", "FAIL", "NOT COVERED", or "" for a working without checks."""
        if any(c.kind != "advice" and not c.passes for c in self.checks):
            return "FAIL"
        if self.not_covered:
            return "NOT COVERED"
        return "PASS" if self.checks else ""

    @property
    def capacity(self) -> Quantity:
        """The greatest design force that every strength check allows.

        A check of the force itself, or of the design action on the connection, allows its own
        capacity. One whose demand grows in proportion to it, as the force on one bolt or the
        stress on a weld, allows so much more or less of it. Checks of another action (a reversal,
        a force in service) and sums of several ratios (tension with bending) have no such force
        and are left out: a force below this one may still fail them.

        Raises
        ------
        DataNotFoundError
            When the calculation has no such check.
        """
        allowed = [
            force
            for check, (_, line) in zip(self.checks, self._lines(CheckLine), strict=True)
            if check.kind == "strength" and (force := self._allowed(line)) is not None
        ]
        if not allowed:
            raise DataNotFoundError(f"{self.heading.mark}: no strength check, so no capacity")
        return quantity(min(allowed), FORCE, self.view)

    def _allowed(self, line: CheckLine) -> float | None:
        """The design force at which a check would be used up; None where it has none."""
        demand = self.sheet.lines[line.demand].symbol
        assert demand is not None
        capacity = self.values[line.capacity]
        bases = self._actions
        if not bases:
            return capacity if demand.role == FORCE else None
        if line.demand in bases:
            return float(capacity)
        ancestors = self._ancestors(line.demand)
        base = max((b for b in bases if b in ancestors), default=None)
        # A pure number is a sum of ratios, which does not grow in proportion.
        if base is None or demand.role.dimensionless or not self.values[line.demand] > 0.0:
            return None
        return float(capacity * self.values[base] / self.values[line.demand])

    @cached_property
    def _actions(self) -> tuple[int, ...]:
        """The line of the design force, and those that take the greatest of it and others."""
        force = self.heading.force
        if force is None:
            return ()
        greater = [i for i, line in self._lines(Extreme) if not line.least and force in line.args]
        return (force, *greater)

    def _ancestors(self, index: int) -> set[int]:
        """Every line that a line is worked out from, itself with them."""
        found, waiting = set(), [index]
        while waiting:
            i = waiting.pop()
            if i not in found:
                found.add(i)
                line = self.sheet.lines[i]
                if isinstance(line, Step | Extreme):
                    waiting += line.args
        return found

    @property
    def utilisation(self) -> float:
        """Utilisation of the governing check; NaN without checks."""
        return self.governing.utilisation if self.governing else math.nan

    def value(self, symbol: str, part: str | None = None) -> Quantity:
        """What a symbol came to, by its name or its text ("N_star", "N*").

        Where several parts have the symbol, give the part's title.

        Raises
        ------
        DataNotFoundError
            For a symbol the calculation does not have, or one in several parts.
        """
        found = [
            (line.part, value, line.symbol)
            for line, value in zip(self.sheet.lines, self.values, strict=True)
            if line.symbol is not None
            and symbol in (line.symbol.name, line.symbol.text)
            and part in (None, line.part)
        ]
        if not found:
            names = {line.symbol.text for line in self.sheet.lines if line.symbol}
            raise DataNotFoundError(
                f"symbol: {symbol!r} is not in the calculation of {self.heading.mark}."
                + did_you_mean(symbol, names)
            )
        if len(found) > 1:
            raise DataNotFoundError(
                f"symbol: {symbol!r} stands in {', '.join(repr(p) for p, _, _ in found)};"
                " give the part, for example value(" + f"{symbol!r}, {found[0][0]!r})"
            )
        _, value, entry = found[0]
        return quantity(value, entry.role, self.view)

    def __getitem__(self, key: str | tuple[str, str]) -> Check:
        part, name = key if isinstance(key, tuple) else (None, key)
        found = [
            c
            for c in self.checks
            if c.name.lower() == name.lower() and (part is None or c.part.lower() == part.lower())
        ]
        if len(found) == 1:
            return found[0]
        if not found:
            raise DataNotFoundError(
                f"check: {key!r} is not in the calculation of {self.heading.mark}."
                + did_you_mean(name, {c.name for c in self.checks})
                + f" It has: {', '.join(sorted({c.name for c in self.checks}))}."
            )
        raise DataNotFoundError(
            f"check: {name!r} stands in {', '.join(repr(c.part) for c in found)};"
            f" give the part, for example calc[{found[0].part!r}, {name!r}]"
        )

    def __iter__(self) -> Iterator[Check]:
        return iter(self.checks)

    def inputs(self) -> dict[str, float]:
        """The inputs by key, in internal units: what `sheet.fill` takes."""
        return {line.key: self.values[i] for i, line in self._lines(Given)}

    @cached_property
    def inputs_hash(self) -> str:
        """Fingerprint of the inputs, their origins and the choices the sheet records."""
        facts = {
            "standard": self.heading.standard_key,
            "inputs": self.inputs(),
            "origins": list(self.origins.values()),
            "lines": [
                [type(line).__name__, line.part, line.title, line.clause, line.note]
                for line in self.sheet.lines
            ],
        }
        text = json.dumps(facts, sort_keys=True, separators=(",", ":"))
        return "sha256:" + hashlib.sha256(text.encode()).hexdigest()

    # Readings -----------------------------------------------------------------------------

    def shown_in(self, view: View) -> Calculation:
        """The same calculation shown in other units."""
        if not isinstance(view, View):
            raise InputError(f"view: got {view!r}; give METRIC, US or METRIC.but(length='m')")
        return replace(self, view=view)

    @property
    def headline(self) -> str:
        """One line that says it all: mark, section, force, verdict, governing check, clause."""
        from tensionlib.calculation.readings import record

        return record.headline(self)

    def record(self) -> dict[str, Any]:
        """The calculation as plain data, what packages and files are made from."""
        return self._record

    def latex(self) -> str:
        """Every line as LaTeX, one aligned row a line."""
        from tensionlib.calculation.readings import latex

        return latex.of(self.record())

    def text(self) -> str:
        """The calculation for a terminal."""
        from tensionlib.calculation.readings import text

        return text.of(self.record())

    def html(self) -> str:
        """The calculation for a notebook: folds on screen, stands whole in print."""
        from tensionlib.calculation.readings import html

        return html.of(self.record())

    def detailing(self) -> DetailingReport:
        """The detailing report: pitch, edges, welds, laps, bolts as bought, room for the wrench."""
        from tensionlib.calculation.readings import detailing

        return detailing.DetailingReport(detailing.rows_of(self.record()))

    def _repr_mimebundle_(self, include: Any = None, exclude: Any = None) -> dict[str, Any]:
        from tensionlib.calculation.readings import bundle

        return bundle.of(self)

    def __repr__(self) -> str:
        return self.headline

    # Helpers ------------------------------------------------------------------------------

    @cached_property
    def _record(self) -> dict[str, Any]:
        from tensionlib.calculation.readings import record

        return record.of(self)

    def _lines(self, kind: type[Line]) -> Iterator[tuple[int, Any]]:
        return ((i, line) for i, line in enumerate(self.sheet.lines) if isinstance(line, kind))

    def _check(self, index: int, line: CheckLine) -> Check:
        demand, capacity = self.sheet.lines[line.demand], self.sheet.lines[line.capacity]
        assert demand.symbol is not None
        assert capacity.symbol is not None
        return Check(
            part=line.part,
            name=line.title,
            clause=line.clause,
            kind=line.kind,
            demand=quantity(self.values[line.demand], demand.symbol.role, self.view),
            capacity=quantity(self.values[line.capacity], capacity.symbol.role, self.view),
            utilisation=self.values[index],
            note=line.note,
        )


def _severity(check: Check) -> float:
    return math.inf if math.isnan(check.utilisation) else check.utilisation
