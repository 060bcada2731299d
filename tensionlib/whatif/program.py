"""A sheet as a study fills it: the lines that decide, on arrays whose shapes go together.

A value that varies with one list alone keeps that list's shape, so that a line is worked out once
for each set of values it can tell apart and not once a row.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from functools import cached_property
from typing import Any

import numpy as np
import numpy.typing as npt

from tensionlib.calculation.sheet import (
    CheckLine,
    Extreme,
    Given,
    Holds,
    NotCovered,
    Sheet,
    Step,
    Upto,
)

Floats = npt.NDArray[np.float64]


@dataclass(frozen=True)
class Outcome:
    """What a block of rows came to, arrays of one shape or of shapes that go together.

    `governing` is the place of the governing check among `Program.checks`; `fails` tells whether
    any strength or detailing check does not pass.
    """

    utilisation: Floats
    governing: npt.NDArray[np.intp]
    fails: npt.NDArray[np.bool_]


@dataclass(frozen=True)
class _Worst:
    """The worst of some checks: how severe, the utilisation behind it, and which."""

    severity: Any
    utilisation: Any
    check: Any


class Program:
    """A sheet, pruned to what its strength and detailing checks and its conditions need."""

    def __init__(self, sheet: Sheet) -> None:
        self.sheet = sheet
        lines = sheet.lines
        self.checks = tuple(
            (i, line)
            for i, line in enumerate(lines)
            if isinstance(line, CheckLine) and line.kind != "advice"
        )
        self.covered = not any(isinstance(line, NotCovered) for line in lines)
        self._decisions = sheet.decisions
        self._to_decide = self._needed([i for i, _ in self._decisions])
        self._to_check = [i for i in self._needed([i for i, _ in self.checks])]

    @cached_property
    def keys(self) -> frozenset[str]:
        """Names of the inputs the program reads."""
        wanted = {*self._to_decide, *self._to_check}
        return frozenset(key for i, key in self.sheet.givens if i in wanted)

    def _needed(self, wanted: list[int]) -> list[int]:
        found: set[int] = set()
        waiting = list(wanted)
        while waiting:
            index = waiting.pop()
            if index in found:
                continue
            found.add(index)
            line = self.sheet.lines[index]
            if isinstance(line, Step | Extreme | Holds):
                waiting += line.args
            elif isinstance(line, Upto):
                waiting.append(line.by)
            elif isinstance(line, CheckLine):
                waiting += [line.demand, line.capacity]
        return sorted(found)

    def _fill(self, needed: list[int], inputs: Mapping[str, Any]) -> list[Any]:
        values: list[Any] = [None] * len(self.sheet.lines)
        lines = self.sheet.lines
        for index in needed:
            line = lines[index]
            values[index] = inputs[line.key] if isinstance(line, Given) else line.evaluate(values)
        return values

    def follows(self, inputs: Mapping[str, Any]) -> Any:
        """Whether rows take the ways this sheet records, as far as its conditions vary: a bool or
        an array."""
        values = self._fill(self._to_decide, inputs)
        out: Any = True
        for index, decision in self._decisions:
            out = out & (np.asarray(values[index]) == decision)
        return out

    def run(self, inputs: Mapping[str, Any]) -> Outcome:
        """What rows that follow this sheet come to."""
        values = self._fill(self._to_check, inputs)
        strength = self._worst(values, "strength")
        detailing = self._worst(values, "detailing")
        if strength is None or detailing is None:
            one = strength or detailing
            if one is None:
                nothing = np.full((1,), np.nan)
                return Outcome(nothing, np.zeros(1, np.intp), np.zeros(1, np.bool_))
            return Outcome(one.utilisation, one.check, ~(one.severity <= 1.0))
        holds = strength.severity <= 1.0
        kept = detailing.severity <= 1.0
        # A broken limit decides only where all strength checks pass.
        swap = holds & ~kept
        return Outcome(
            np.where(swap, detailing.utilisation, strength.utilisation),
            np.where(swap, detailing.check, strength.check),
            ~(holds & kept),
        )

    def _worst(self, values: list[Any], kind: str) -> _Worst | None:
        """The first of the most severe checks of a kind; NaN is as severe as no capacity."""
        by_shape: dict[tuple[int, ...], _Worst] = {}
        for place, (index, line) in enumerate(self.checks):
            if line.kind != kind:
                continue
            used = np.asarray(values[index])
            severe = np.where(np.isnan(used), np.inf, used)
            one = _Worst(severe, used, np.full(used.shape, place, np.uint8))
            before = by_shape.get(used.shape)
            by_shape[used.shape] = one if before is None else _worse(before, one)
        worst: _Worst | None = None
        for shape in sorted(by_shape, key=lambda s: int(np.prod(s))):
            worst = by_shape[shape] if worst is None else _worse(worst, by_shape[shape])
        return worst


def _worse(a: _Worst, b: _Worst) -> _Worst:
    takes = (b.severity > a.severity) | ((b.severity == a.severity) & (b.check < a.check))
    return _Worst(
        np.where(takes, b.severity, a.severity),
        np.where(takes, b.utilisation, a.utilisation),
        np.where(takes, b.check, a.check),
    )
