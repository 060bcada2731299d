"""One grid of alternatives worked out: pieces into tables, rows into blocks, blocks into results.

A block is a set of cells over its outer lists times the whole of its inner lists, all of whose
rows follow one sheet. Where a condition parts the rows of a block, the lists it varies with become
outer ones and the cells go two ways, so that no row is ever filled on a sheet it does not follow.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, field
from typing import Any

import numpy as np
import numpy.typing as npt

from tensionlib.errors import TensionlibError
from tensionlib.whatif.program import Program
from tensionlib.whatif.tables import Table

# Rows worked out together: small enough for the processor's cache, large enough for numpy.
ROWS_AT_ONCE = 32_768
CANNOT, PASS, FAIL, NOT_COVERED = range(4)

Indices = npt.NDArray[np.int64]


@dataclass
class Results:
    """Of each row: utilisation of the governing check, its number among `checks`, the number of
    the sheet, the verdict (`CANNOT`, `PASS`, `FAIL`, `NOT_COVERED`)."""

    utilisation: npt.NDArray[np.float64]
    governing: npt.NDArray[np.uint16]
    sheet: npt.NDArray[np.uint16]
    verdict: npt.NDArray[np.uint8]
    checks: list[tuple[str, str]] = field(default_factory=list)
    sheets: list[int] = field(default_factory=list)
    """Of each sheet, a row that follows it."""

    @classmethod
    def empty(cls, rows: int) -> Results:
        return cls(
            np.full(rows, np.nan),
            np.zeros(rows, np.uint16),
            np.zeros(rows, np.uint16),
            np.zeros(rows, np.uint8),
        )

    def number_of(self, check: tuple[str, str]) -> int:
        if check not in self.checks:
            self.checks.append(check)
        return self.checks.index(check)


@dataclass(frozen=True)
class _Block:
    """Cells over the lists `outer`, each with the whole of every other list."""

    outer: tuple[int, ...]
    cells: Indices


Told = Callable[[int], None]
Walked = Callable[[int], tuple[Program, float]]
"""Of a row: the program of its sheet, and the utilisation a single design of it gives."""


class Grid:
    """A grid of `shape`, whose tables are given and whose `walk` writes the sheet of a row."""

    def __init__(self, shape: tuple[int, ...], tables: list[Table], walk: Walked) -> None:
        self.shape = shape
        self.tables = tables
        self.walk = walk
        self.columns = {key: t for t in tables for key in t.columns}
        self._masks = [t for t in tables if t.refusals]

    def work_out(self, out: Results, told: Told) -> None:
        """Fill `out`, whose arrays have one row each of this grid in C order.

        Parameters
        ----------
        told : function
            Called with numbers of rows as they are done.
        """
        self._out = {
            name: getattr(out, name).reshape(self.shape)
            for name in ("utilisation", "governing", "sheet", "verdict")
        }
        for block in self._blocks():
            self._take(block, out, told)

    def _blocks(self) -> Iterator[_Block]:
        """Rows that are steered alike before any condition is tested."""
        steering = [t for t in self.tables if t.ways > 1]
        outer = tuple(sorted({axis for t in steering for axis in t.axes}))
        size = tuple(self.shape[axis] for axis in outer)
        code = np.zeros(size, np.int64)
        valid = np.ones(size, np.bool_)
        for t in steering:
            spread = _spread(t.codes, t.axes, outer)
            code = code * (int(t.codes.max()) + 1) + np.maximum(spread, 0)
            valid = valid & (spread >= 0)
        code, valid = np.broadcast_to(code, size).ravel(), np.broadcast_to(valid, size).ravel()
        cells = np.flatnonzero(valid)
        order = cells[np.argsort(code[cells], kind="stable")]
        starts = np.flatnonzero(np.diff(code[order], prepend=-1))
        for chunk in np.split(order, starts[1:]) if order.size else ():
            yield _Block(outer, np.sort(chunk))

    def _take(self, block: _Block, out: Results, told: Told) -> None:
        waiting = [block]
        while waiting:
            at = waiting.pop()
            row = self._first_valid(at)
            if row is None:
                continue
            try:
                program, alone = self.walk(row)
            except TensionlibError:
                # The walk refuses this row for a reason no piece knows: only a single design of
                # it can say so, and the rest of the block goes on without it.
                waiting += self._without(at, row)
                continue
            inner = self._inner(at.outer)
            follows = np.asarray(program.follows(self._inputs(program, at)))
            if not follows.all():
                varies = [
                    axis
                    for k, axis in enumerate(inner)
                    if follows.ndim and follows.shape[k + 1] > 1
                ]
                at = self._promoted(at, varies)
                keep = np.asarray(program.follows(self._inputs(program, at)))
                keep = np.broadcast_to(keep.reshape(-1), at.cells.shape)
                waiting.append(_Block(at.outer, at.cells[~keep]))
                at = _Block(at.outer, at.cells[keep])
            number = len(out.sheets)
            out.sheets.append(row)
            self._run(at, program, number, out, told)
            found = float(out.utilisation[row])
            if found != alone and not (np.isnan(found) and np.isnan(alone)):
                raise AssertionError(
                    f"row {row} comes to {found!r} in the study and {alone!r} alone; please report"
                    " this: a study is never to differ from a single design"
                )

    # Blocks -------------------------------------------------------------------------------

    def _inner(self, outer: tuple[int, ...]) -> tuple[int, ...]:
        return tuple(axis for axis in range(len(self.shape)) if axis not in outer)

    def _promoted(self, block: _Block, axes: list[int]) -> _Block:
        """The same rows with more lists among the outer ones."""
        outer = tuple(sorted((*block.outer, *axes)))
        at = np.unravel_index(block.cells, self._sizes(block.outer))
        grids = np.meshgrid(
            np.arange(len(block.cells)), *(np.arange(self.shape[a]) for a in axes), indexing="ij"
        )
        where = {axis: at[k][grids[0].ravel()] for k, axis in enumerate(block.outer)}
        where |= {axis: grids[k + 1].ravel() for k, axis in enumerate(axes)}
        cells = np.ravel_multi_index(tuple(where[a] for a in outer), self._sizes(outer))
        return _Block(outer, np.sort(cells))

    def _sizes(self, axes: tuple[int, ...]) -> tuple[int, ...]:
        # A block without outer lists has one cell.
        return tuple(self.shape[axis] for axis in axes) or (1,)

    def _places(self, block: _Block) -> dict[int, Indices]:
        found = np.unravel_index(block.cells, self._sizes(block.outer))
        return dict(zip(block.outer, found, strict=False))

    def _first_valid(self, block: _Block) -> int | None:
        """The first row of a block that can be built."""
        step = max(1, ROWS_AT_ONCE // self._count(self._inner(block.outer)))
        for start in range(0, len(block.cells), step):
            part = _Block(block.outer, block.cells[start : start + step])
            valid = self._valid(part)
            if valid.any():
                return int(self._rows(part).reshape(-1)[np.flatnonzero(valid)[0]])
        return None

    def _without(self, block: _Block, row: int) -> list[_Block]:
        every = tuple(range(len(self.shape)))
        whole = self._promoted(block, [a for a in every if a not in block.outer])
        rest = whole.cells[whole.cells != row]
        return [_Block(every, rest)] if rest.size else []

    def _count(self, axes: tuple[int, ...]) -> int:
        return int(np.prod([self.shape[a] for a in axes], dtype=np.int64)) if axes else 1

    # Arrays over a block: one axis for its cells, then one for each inner list -------------

    def _over(self, values: Any, axes: tuple[int, ...], block: _Block) -> Any:
        """An array over some lists, over a block: of length 1 where it does not vary."""
        if not axes:
            return float(values) if values.dtype == np.float64 else values[()]
        places, inner = self._places(block), self._inner(block.outer)
        out_of = [a for a in axes if a in places]
        within = [a for a in axes if a not in places]
        turned = np.moveaxis(values, [axes.index(a) for a in (*out_of, *within)], range(len(axes)))
        rows = turned[tuple(places[a] for a in out_of)] if out_of else turned[np.newaxis]
        sizes = [self.shape[a] if a in within else 1 for a in inner]
        return rows.reshape(rows.shape[0], *sizes)

    def _inputs(self, program: Program, block: _Block) -> dict[str, Any]:
        return {
            key: self._over(t.columns[key], t.axes, block)
            for key, t in self.columns.items()
            if key in program.keys
        }

    def _valid(self, block: _Block) -> npt.NDArray[np.bool_]:
        """Whether each row of a block can be built."""
        inner = self._inner(block.outer)
        shape = (len(block.cells), *(self.shape[a] for a in inner))
        valid: Any = np.ones((1,) * len(shape), np.bool_)
        for t in self._masks:
            valid = valid & self._over(t.codes >= 0, t.axes, block)
        return np.broadcast_to(valid, shape)

    def _rows(self, block: _Block) -> Indices:
        """Number of each row of a block in the grid."""
        inner = self._inner(block.outer)
        places = self._places(block)
        shape = (len(block.cells), *(self.shape[a] for a in inner))
        where = [
            places[a].reshape(-1, *(1,) * len(inner))
            if a in places
            else np.arange(self.shape[a]).reshape(
                1, *(self.shape[a] if a == b else 1 for b in inner)
            )
            for a in range(len(self.shape))
        ]
        if not where:
            return np.zeros(shape, np.int64)
        return np.broadcast_to(np.ravel_multi_index(np.broadcast_arrays(*where), self.shape), shape)

    def _run(
        self,
        block: _Block,
        program: Program,
        number: int,
        out: Results,
        told: Told,
    ) -> None:
        inner = list(self._inner(block.outer))
        promote: list[int] = []
        while inner and self._count(tuple(inner)) > ROWS_AT_ONCE:
            promote.append(inner.pop(0))
        names = np.array([out.number_of((c.part, c.title)) for _, c in program.checks], np.uint16)
        step = max(1, ROWS_AT_ONCE // self._count(tuple(inner)))
        for part in self._chunks(block, promote, step):
            self._run_part(part, program, number, names)
            told(len(part.cells) * self._count(tuple(inner)))

    def _chunks(self, block: _Block, promote: list[int], step: int) -> Iterator[_Block]:
        each = self._count(tuple(promote))
        if each == 1:
            for start in range(0, len(block.cells), step):
                yield _Block(block.outer, block.cells[start : start + step])
            return
        # Promoted a few cells at a time, so that a list of all rows is never held.
        few = max(1, step // each)
        for start in range(0, len(block.cells), few):
            some = self._promoted(_Block(block.outer, block.cells[start : start + few]), promote)
            for first in range(0, len(some.cells), step):
                yield _Block(some.outer, some.cells[first : first + step])

    def _run_part(
        self, block: _Block, program: Program, number: int, names: npt.NDArray[np.uint16]
    ) -> None:
        outcome = program.run(self._inputs(program, block))
        inner = self._inner(block.outer)
        shape = (len(block.cells), *(self.shape[a] for a in inner))
        valid = self._valid(block) if self._masks else np.ones((1,) * len(shape), np.bool_)
        verdict = np.where(outcome.fails, FAIL, PASS if program.covered else NOT_COVERED)
        places = self._places(block)
        found = {
            "utilisation": (outcome.utilisation, np.nan),
            "governing": (names[outcome.governing] if len(names) else 0, 0),
            "sheet": (np.uint16(number), 0),
            "verdict": (verdict, CANNOT),
        }
        for name, (values, otherwise) in found.items():
            if not valid.all():
                values = np.where(valid, values, otherwise)
            target = np.moveaxis(self._out[name], [*block.outer, *inner], range(len(self.shape)))
            filled = np.broadcast_to(_as_block(values, len(shape)), shape)
            if block.outer:
                target[tuple(places[a] for a in block.outer)] = filled
            else:
                target[...] = filled[0]


def _as_block(values: Any, ndim: int) -> npt.NDArray[Any]:
    found: npt.NDArray[Any] = np.asarray(values)
    return found.reshape((1,) * ndim) if found.ndim < ndim else found


def _spread(
    values: npt.NDArray[np.int64], axes: tuple[int, ...], over: tuple[int, ...]
) -> npt.NDArray[np.int64]:
    """An array over some lists as one over more of them, of length 1 for each added."""
    shape = [1] * len(over)
    for k, axis in enumerate(axes):
        shape[over.index(axis)] = values.shape[k]
    return values.reshape(shape)
