"""The sheet: the lines of a calculation without numbers, and how values fill it.

A line knows which earlier lines it reads; it never holds what they came to. The same lines are
filled with floats for one member and with arrays of shape (n,) for n alternatives.
"""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING, Any, Literal, NoReturn

from tensionlib.calculation import dispatch
from tensionlib.errors import InputError

if TYPE_CHECKING:
    import numpy as np
    import numpy.typing as npt

    from tensionlib.calculation.formula import Condition, Formula
    from tensionlib.calculation.symbols import Symbol
    from tensionlib.calculation.tables import ThresholdTable

CheckKind = Literal["strength", "detailing", "advice"]
Values = Sequence[Any]


class Entry:
    """One quantity of a calculation in the making: a symbol and the line that gives it.

    An entry has no arithmetic and no truth value, so that everything computed is a line of the
    sheet and nothing but choices and tested conditions can steer the work.
    """

    __slots__ = ("index", "owner", "symbol")

    def __init__(self, owner: object, index: int, symbol: Symbol) -> None:
        self.owner = owner
        self.index = index
        self.symbol = symbol

    def __repr__(self) -> str:
        return f"<entry {self.symbol.text}, {self.symbol.role.name}>"

    def _refuse(self, *_: object) -> NoReturn:
        raise InputError(
            f"{self.symbol.text}: an entry has no arithmetic and no truth value; write a formula"
            " and add it with step(...), or test it with holds(condition, ...)"
        )

    __bool__ = __float__ = __int__ = __neg__ = __abs__ = _refuse
    __add__ = __radd__ = __sub__ = __rsub__ = __mul__ = __rmul__ = _refuse
    __truediv__ = __rtruediv__ = __pow__ = __rpow__ = _refuse
    __lt__ = __le__ = __gt__ = __ge__ = __eq__ = __ne__ = _refuse
    __hash__ = object.__hash__


@dataclass(frozen=True, slots=True, kw_only=True)
class Line:
    """What every line has: the part it stands in, its symbol, what it is, and its clause."""

    part: str
    symbol: Symbol | None = None
    title: str = ""
    clause: str = ""
    note: str = ""

    def evaluate(self, values: Values) -> Any:
        """What the line comes to on the values of the earlier lines; None for a line of words."""
        return None


@dataclass(frozen=True, slots=True, kw_only=True)
class Given(Line):
    """An input. Its value is put in from outside under `key`."""

    key: str


@dataclass(frozen=True, slots=True, kw_only=True)
class Step(Line):
    """A formula on earlier lines."""

    formula: Formula
    args: tuple[int, ...]

    def evaluate(self, values: Values) -> Any:
        return self.formula.function(*[values[index] for index in self.args])


@dataclass(frozen=True, slots=True, kw_only=True)
class Fixed(Line):
    """A number that a choice picked from a clause's table."""

    value: float
    source: str = ""

    def evaluate(self, values: Values) -> Any:
        return self.value


@dataclass(frozen=True, slots=True, kw_only=True)
class Upto(Line):
    """A table read by a threshold: the yield stress by thickness."""

    table: ThresholdTable
    row: str
    by: int
    source: str

    def evaluate(self, values: Values) -> Any:
        return self.table.read(self.row, values[self.by])


@dataclass(frozen=True, slots=True, kw_only=True)
class Extreme(Line):
    """The least or the greatest of several lines, naming the one that rules."""

    args: tuple[int, ...]
    least: bool

    def evaluate(self, values: Values) -> Any:
        pick = dispatch.minimum if self.least else dispatch.maximum
        return pick(*[values[index] for index in self.args])

    def ruling(self, values: Values) -> int:
        """Index of the line that ruled in a scalar fill; the first one of equals."""
        pick = min if self.least else max
        return pick(self.args, key=lambda index: values[index])


@dataclass(frozen=True, slots=True, kw_only=True)
class Holds(Line):
    """A tested condition and the way the work took because of it."""

    condition: Condition
    args: tuple[int, ...]
    decision: bool
    consequence: str = ""

    def evaluate(self, values: Values) -> Any:
        return self.condition.function(*[values[index] for index in self.args])


@dataclass(frozen=True, slots=True, kw_only=True)
class CheckLine(Line):
    """Demand against capacity. Its value is the utilisation."""

    demand: int
    capacity: int
    kind: CheckKind

    def evaluate(self, values: Values) -> Any:
        return utilisation(values[self.demand], values[self.capacity])


@dataclass(frozen=True, slots=True, kw_only=True)
class Note(Line):
    """Words between the lines; the words are the title."""


@dataclass(frozen=True, slots=True, kw_only=True)
class NotCovered(Line):
    """A check that the standard or the library does not offer: never a pass."""


def utilisation(demand: Any, capacity: Any) -> Any:
    """Demand over capacity, both in internal units, floats or arrays of shape (n,).

    No demand (zero) on a capacity of zero or more is 0; any demand on a capacity of zero or less
    is infinite; NaN stays NaN and never passes.
    """
    if isinstance(demand, float) and isinstance(capacity, float):
        if math.isnan(demand) or math.isnan(capacity):
            return math.nan
        if demand == 0.0 and capacity >= 0.0:
            return 0.0
        return demand / capacity if capacity > 0.0 else math.inf
    import numpy as np

    demand, capacity = np.broadcast_arrays(
        np.asarray(demand, dtype=float), np.asarray(capacity, dtype=float)
    )
    out = np.full(demand.shape, np.inf)
    np.divide(demand, capacity, out=out, where=capacity > 0.0)
    out[(demand == 0.0) & (capacity >= 0.0)] = 0.0
    out[np.isnan(demand) | np.isnan(capacity)] = np.nan
    return out


def passes(utilised: Any) -> Any:
    """Whether a utilisation passes: at most 1, decided in float64; NaN does not."""
    return utilised <= 1.0


@dataclass(frozen=True, slots=True)
class Filled:
    """A sheet filled with arrays: one row an alternative.

    `values` holds what each line came to (a float where nothing varies, else shape (n,)).
    `follows` tells for each row whether its tested conditions went the way the sheet records; a
    row that does not follow belongs to another sheet and its numbers here mean nothing.
    """

    sheet: Sheet
    values: tuple[Any, ...]
    follows: npt.NDArray[np.bool_]

    def utilisations(self) -> npt.NDArray[np.float64]:
        """Utilisation of each check, shape (checks, n), in the order of `Sheet.checks`."""
        import numpy as np

        rows = [self.values[index] for index in self.sheet.checks]
        return np.stack([np.broadcast_to(np.asarray(row), self.follows.shape) for row in rows])


@dataclass(frozen=True)
class Sheet:
    """The lines of a calculation, in order, without a number of any one member."""

    lines: tuple[Line, ...]

    @cached_property
    def checks(self) -> tuple[int, ...]:
        """Indices of the check lines."""
        return tuple(i for i, line in enumerate(self.lines) if isinstance(line, CheckLine))

    @cached_property
    def givens(self) -> tuple[tuple[int, str], ...]:
        """Index and key of each input line."""
        return tuple((i, x.key) for i, x in enumerate(self.lines) if isinstance(x, Given))

    @property
    def keys(self) -> tuple[str, ...]:
        """Names of the inputs the sheet is filled with."""
        return tuple(key for _, key in self.givens)

    @cached_property
    def decisions(self) -> tuple[tuple[int, bool], ...]:
        """Index of each tested condition and the way the sheet records for it."""
        return tuple((i, x.decision) for i, x in enumerate(self.lines) if isinstance(x, Holds))

    @cached_property
    def _computed(self) -> tuple[tuple[int, Line], ...]:
        words = (Given, Note, NotCovered)
        return tuple((i, x) for i, x in enumerate(self.lines) if not isinstance(x, words))

    def evaluate(self, inputs: Mapping[str, Any]) -> tuple[Any, ...]:
        """What each line comes to for these inputs: floats or arrays of shape (n,).

        Raises
        ------
        InputError
            For a missing input, or a name the sheet does not have.
        """
        keys = set(self.keys)
        if keys != inputs.keys():
            missing, unknown = keys - inputs.keys(), inputs.keys() - keys
            what, names = ("missing", missing) if missing else ("unknown", unknown)
            raise InputError(f"inputs: {what} {', '.join(sorted(names))}")
        values: list[Any] = [None] * len(self.lines)
        for index, key in self.givens:
            values[index] = inputs[key]
        for index, line in self._computed:
            values[index] = line.evaluate(values)
        return tuple(values)

    def fill(self, inputs: Mapping[str, Any]) -> Filled:
        """Fill with arrays of one shape (n,) and floats, which stand for every row.

        Raises
        ------
        InputError
            For missing or unknown inputs, or arrays of different lengths.
        """
        import numpy as np

        shapes = {np.shape(value) for value in inputs.values() if np.ndim(value)}
        if len(shapes) > 1:
            raise InputError(
                f"inputs: arrays of different shapes {sorted(shapes)}; give one length"
            )
        shape = shapes.pop() if shapes else (1,)
        values = self.evaluate(inputs)
        follows = np.ones(shape, dtype=np.bool_)
        for index, decision in self.decisions:
            follows &= np.asarray(values[index]) == decision
        return Filled(self, values, follows)
