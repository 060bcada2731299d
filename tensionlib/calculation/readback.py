"""Reading a printed line back: what a checker with a calculator would get from it.

The very LaTeX that is shown is parsed and evaluated, and the printed result must lie inside the
line's own rounding band. A picture that lost a bracket is found here, not on site.
"""

from __future__ import annotations

import math
import operator
import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import NoReturn

from tensionlib.errors import TensionlibError
from tensionlib.quantities import LINE_FIGURES


class ReadbackError(TensionlibError):
    """A printed line whose numbers do not give its printed result."""


@dataclass(frozen=True)
class Value:
    """What a line came to, and how far the rounding of its printed numbers may move it."""

    value: float
    band: float


@dataclass
class _Number:
    value: float
    half_unit: float


Node = Callable[[list[float]], float]

_TOKEN = re.compile(
    r"\s*(?:(?P<number>\d+(?:\.\d+)?)|(?P<name>\\[A-Za-z]+|\\.)|(?P<other>[-+^_{}(),/|]))"
)
_SKIPPED = (r"\ ", r"\,")
_CALLS: dict[str, Callable[..., float]] = {
    r"\min": min,
    r"\max": max,
    r"\sin": math.sin,
    r"\cos": math.cos,
    r"\tan": math.tan,
}


def _joined(operation: Callable[[float, float], float], left: Node, right: Node) -> Node:
    return lambda v: operation(left(v), right(v))


@dataclass
class _Parser:
    """Recursive descent over the LaTeX that templates print."""

    text: str
    units: Mapping[str, float]
    symbols: Mapping[str, float] = field(default_factory=dict)
    numbers: list[_Number] = field(default_factory=list)

    def __post_init__(self) -> None:
        self.at = 0
        # Longest first, so that "t_{w,\min}" is not read as "t".
        self._names = sorted(self.symbols, key=len, reverse=True)

    def parse(self) -> Node:
        node = self._sum()
        if self._peek():
            self._fail(f"{self._peek()!r} left over")
        return node

    def _sum(self) -> Node:
        node = self._product()
        while (sign := self._peek()) in ("+", "-"):
            self._next()
            node = _joined(operator.add if sign == "+" else operator.sub, node, self._product())
        return node

    def _product(self) -> Node:
        node = self._power()
        while self._peek() == r"\cdot":
            self._next()
            node = _joined(operator.mul, node, self._power())
        return node

    def _power(self) -> Node:
        base = self._atom()
        if self._peek() != "^":
            return base
        self._next()
        self._expect("{")
        exponent = int(self._next())  # a clause's own, never a rounded number
        self._expect("}")
        return lambda v: math.pow(base(v), exponent)

    def _atom(self) -> Node:
        for name in self._names:
            if self.text.startswith(name, self._skip()):
                self.at += len(name)
                value = self.symbols[name]
                return lambda v: value
        token = self._next()
        if token == "-":
            inner = self._power()
            return lambda v: -inner(v)
        if token == r"\frac":
            above, below = self._group(), self._group()
            return lambda v: above(v) / below(v)
        if token == r"\sqrt":
            inner = self._group()
            return lambda v: math.sqrt(inner(v))
        if token == r"\left":
            return self._bracket()
        if token in _CALLS:
            self._expect(r"\left")
            self._expect("(")
            return self._call(_CALLS[token])
        if token[:1].isdigit():
            return self._number(token)
        self._fail(f"{token!r} is not expected")

    def _bracket(self) -> Node:
        opened = self._next()
        inner = self._sum()
        self._expect(r"\right")
        if opened == "|":
            self._expect("|")
            return lambda v: abs(inner(v))
        if opened != "(":
            self._fail(f"{opened!r} after \\left")
        self._expect(")")
        return inner

    def _call(self, function: Callable[..., float]) -> Node:
        args = [self._sum()]
        while self._peek() == ",":
            self._next()
            args.append(self._sum())
        self._expect(r"\right")
        self._expect(")")
        return lambda v: function(*[arg(v) for arg in args])

    def _group(self) -> Node:
        self._expect("{")
        node = self._sum()
        self._expect("}")
        return node

    def _number(self, token: str) -> Node:
        value = float(token)
        place = len(self.numbers)
        unit = self._unit()
        # Trailing zeros are not printed, so how many figures stand there does not tell which was
        # the last one kept. A clause's own number is exact; banding it too moves the line by no
        # more than the rounding of any other.
        half = 0.5 * 10.0 ** (math.floor(math.log10(value)) - LINE_FIGURES + 1) if value else 0.0
        self.numbers.append(_Number(value * unit, half * unit))
        return lambda v: v[place]

    def _unit(self) -> float:
        start = self._skip()
        for latex in sorted(self.units, key=len, reverse=True):
            # A unit with a scale of its own, "10⁶ mm⁴", is printed as a factor.
            printed = r"\cdot " + latex if latex.startswith("10^") else latex
            if latex and self.text.startswith(printed, start):
                self.at = start + len(printed)
                return self.units[latex]
        return 1.0

    # Tokens -------------------------------------------------------------------------------

    def _skip(self) -> int:
        while True:
            while self.at < len(self.text) and self.text[self.at].isspace():
                self.at += 1
            if not self.text.startswith(_SKIPPED, self.at):
                return self.at
            self.at += 2

    def _match(self) -> re.Match[str] | None:
        return _TOKEN.match(self.text, self._skip())

    def _peek(self) -> str:
        found = self._match()
        if found is None:
            return self.text[self.at : self.at + 1]
        return found.group().strip()

    def _next(self) -> str:
        found = self._match()
        if found is None:
            self._fail("the line ends too soon" if self.at >= len(self.text) else "not readable")
        self.at = found.end()
        return found.group().strip()

    def _expect(self, token: str) -> None:
        got = self._next()
        if got != token:
            self._fail(f"{got!r} where {token!r} is due")

    def _fail(self, why: str) -> NoReturn:
        raise ReadbackError(f"cannot read back {self.text!r} at character {self.at}: {why}")


def evaluate(
    latex: str, units: Mapping[str, float], symbols: Mapping[str, float] | None = None
) -> Value:
    """Evaluate printed LaTeX.

    Parameters
    ----------
    latex : str
        A right-hand side as a template prints it.
    units : mapping
        Internal units in one of each printed unit, by the unit's LaTeX.
    symbols : mapping, optional
        Values of symbols by their LaTeX, to read the symbolic side.

    Returns
    -------
    Value
        In internal units. The band is the sum over the printed numbers of how far half a unit in
        the fifth figure of each, the last that lines print, moves the value.

    Raises
    ------
    ReadbackError
        For LaTeX outside what templates print.
    """
    parser = _Parser(latex, units, symbols or {})
    node = parser.parse()
    try:
        return _banded(node, parser.numbers)
    except (ZeroDivisionError, ValueError, OverflowError) as error:
        raise ReadbackError(f"cannot work out {latex!r}: {error}") from None


def _banded(node: Node, numbers: list[_Number]) -> Value:
    at = [number.value for number in numbers]
    value = node(at)
    band = 0.0
    for i, number in enumerate(numbers):
        if number.half_unit:
            moved = []
            for sign in (1.0, -1.0):
                shifted = list(at)
                shifted[i] += sign * number.half_unit
                moved.append(abs(node(shifted) - value))
            band += max(moved)
    return Value(value, band)


def check_line(numeric: str, result: str, units: Mapping[str, float]) -> None:
    """Check that a line's substituted numbers give its printed result.

    Raises
    ------
    ReadbackError
        With the line, what it reads back as and what it prints.
    """
    read = evaluate(numeric, units)
    printed = evaluate(result, units)
    # The second-order part of the rounding, and the last bits of the arithmetic.
    slack = 1e-3 * read.band + 1e-9 * max(abs(read.value), abs(printed.value), 1e-9)
    if not abs(read.value - printed.value) <= read.band + printed.band + slack:
        raise ReadbackError(
            f"the line {numeric} = {result} does not hold: its numbers give {read.value:.6g},"
            f" it prints {printed.value:.6g} (internal units; rounding allows"
            f" {read.band + printed.band:.2g})"
        )
