"""Pieces made for each set of values they can tell apart: the tables a study gathers rows from."""

from __future__ import annotations

import itertools
from collections.abc import Callable, Hashable
from dataclasses import dataclass
from typing import Any

import numpy as np
import numpy.typing as npt

from tensionlib.calculation.inputs import Inputs
from tensionlib.errors import InputError, TensionlibError
from tensionlib.members.pieces import Piece
from tensionlib.whatif.fields import Fields

Made = tuple[dict[str, float], Hashable]
MOST_CELLS = 2_000_000


@dataclass(frozen=True)
class Table:
    """What one piece makes, over the lists it depends on.

    Every array has one axis for each list in `axes`, as long as the list. `columns` are numbers
    by their key on a sheet, NaN where there is none. `codes` tell apart what can steer a walk: -1
    where the piece refuses, for the reason in `refusals` by the place in `cells`.
    """

    axes: tuple[int, ...]
    columns: dict[str, npt.NDArray[np.float64]]
    codes: npt.NDArray[np.int64]
    cells: npt.NDArray[np.int64]
    refusals: dict[int, str]

    @property
    def ways(self) -> int:
        """How many ways of steering there are among rows that can be built."""
        return len(np.unique(self.codes[self.codes >= 0]))

    def why(self, place: tuple[int, ...]) -> str:
        """Why the piece refuses the row at this place of its lists, or ""."""
        cell = int(self.cells[place]) if self.axes else int(self.cells)
        return self.refusals.get(cell, "")


def flat(inputs: Inputs, prefix: str) -> Made:
    """Numbers by key and what steers of a piece's `Inputs`."""
    named = Inputs(inputs.choices, inputs.own, inputs.tables, prefix, inputs.parts, inputs.words)
    return {key: number.value for key, number in named.numbers().items()}, named.steering


def at_end(reads: tuple[str, ...], end: str) -> tuple[str, ...]:
    """Names of fields as a piece reads them, at the end at hand."""
    return tuple(
        f"{end}{read[3:]}" if read == "end" or read.startswith("end.") else read for read in reads
    )


def of_piece(fields: Fields, piece: Piece, end: str, **same: str) -> Table:
    """The table of a piece of the member (`end` "") or of an end."""
    prefix = same["prefix"]

    def make(pick: dict[int, int]) -> Made:
        return flat(piece.make(fields.given(piece.reads, pick, end, **same)), prefix)

    return table(fields, at_end(piece.reads, end), make)


def table(fields: Fields, names: tuple[str, ...], make: Callable[[dict[int, int]], Made]) -> Table:
    """What `make` gives for each set of values that some fields can tell apart.

    Raises
    ------
    InputError
        Where there would be more than `MOST_CELLS` of them.
    """
    axes = fields.axes_of(names)
    found = [fields.classes(number, names) for number in axes]
    firsts = [first for _, first in found]
    shape = tuple(len(first) for first in firsts)
    size = int(np.prod(shape, dtype=np.int64))
    if size > MOST_CELLS:
        lists = ", ".join(fields.axes[number].label for number in axes)
        raise InputError(
            f"vary: {size:,} different sets of {lists} act together; at most {MOST_CELLS:,} are"
            " accepted, so shorten a list or study them in parts"
        )
    codes = np.empty(size, np.int64)
    rows: list[dict[str, float]] = []
    known: dict[Hashable, int] = {}
    refusals: dict[int, str] = {}
    for cell, places in enumerate(itertools.product(*firsts)):
        try:
            numbers, steering = make(dict(zip(axes, places, strict=True)))
        except TensionlibError as error:
            refusals[cell] = str(error)
            codes[cell] = -1
            rows.append({})
            continue
        codes[cell] = known.setdefault(steering, len(known))
        rows.append(numbers)
    keys = {key for row in rows for key in row}
    index: Any = np.ix_(*(np.asarray(of, np.intp) for of, _ in found)) if axes else ()
    columns = {
        key: np.array([row.get(key, np.nan) for row in rows]).reshape(shape)[index]
        for key in sorted(keys)
    }
    cells = np.arange(size, dtype=np.int64).reshape(shape)[index]
    return Table(axes, columns, codes.reshape(shape)[index], cells, refusals)
