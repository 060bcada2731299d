"""A study as a table: a pandas data frame of some rows, or a Parquet file of all."""

from __future__ import annotations

import os
import tempfile
from collections.abc import Sequence
from os import PathLike
from pathlib import Path
from typing import TYPE_CHECKING, Any

import numpy as np
import numpy.typing as npt

from tensionlib.errors import InputError, TensionlibError
from tensionlib.quantities import Quantity, View
from tensionlib.standards import Standard
from tensionlib.steel import Grade, Section
from tensionlib.whatif.extras import need
from tensionlib.whatif.objectives import Objective, Rates, objective
from tensionlib.whatif.tables import table

if TYPE_CHECKING:
    import pandas as pd

    from tensionlib.whatif.study import Study

By = str | Rates | Objective
ROWS_AT_ONCE = 1_000_000
MOST_ROWS = 5_000_000
Rows = npt.NDArray[np.int64]


class Column:
    """A varied field: its values, each once, and which of them each row has."""

    def __init__(self, study: Study, name: str) -> None:
        self.name = name
        self._study = study
        fields = study.fields
        shown: list[Any] = []
        places: dict[Any, int] = {}
        view = study.base.view

        def make(pick: dict[int, int]) -> tuple[dict[str, float], Any]:
            try:
                value = _shown(fields.value(name, pick), view)
            except TensionlibError:
                value = None
            if value not in places:
                places[value] = len(shown)
                shown.append(value)
            return {"place": float(places[value])}, ()

        made = table(fields, (name,), make)
        self._axes = made.axes
        self._places = made.columns["place"].astype(np.int32)
        self.values = shown
        unit = _unit(fields.value(name, dict.fromkeys(made.axes, 0)), view)
        self.head = f"{name} [{unit}]" if unit else name
        self.numeric = all(isinstance(value, int | float | None) for value in shown)

    def places(self, rows: Rows) -> npt.NDArray[np.int32]:
        """Which of the values each of these rows has."""
        if not self._axes:
            return np.zeros(len(rows), np.int32)
        at = np.unravel_index(rows, self._study.shape)
        found: npt.NDArray[np.int32] = self._places[tuple(at[axis] for axis in self._axes)]
        return found


def _shown(value: Any, view: View) -> Any:
    if isinstance(value, Quantity):
        return float(f"{value.internal / view.unit(value.role).size:.10g}")
    if isinstance(value, Section):
        return value.designation
    if isinstance(value, Grade):
        return value.name
    if isinstance(value, Standard):
        return f"{value.source.short}"
    if value is None or isinstance(value, str | int | float | bool):
        return value
    return getattr(value, "label", None) or f"{type(value).__name__}"


def _unit(value: Any, view: View) -> str:
    return view.unit(value.role).name if isinstance(value, Quantity) else ""


def columns(study: Study) -> list[Column]:
    """The fields lists and rules set, in their order.

    A list of whole objects is shown by the number of each in its list.
    """
    names = [name for axis in study.fields.axes for name in axis.names]
    return [Column(study, name) for name in (*names, *study.fields.rules)]


def frame(study: Study, rows: Sequence[int] | Rows | None, by: Sequence[By]) -> pd.DataFrame:
    """Rows of a study as a data frame, indexed by their numbers."""
    pandas = need("pandas")
    if rows is None and len(study) > MOST_ROWS:
        raise InputError(
            f"rows: all {len(study):,} would not fit well in a data frame; give some rows, take"
            " best(...), or write_parquet(...)"
        )
    at = np.arange(len(study)) if rows is None else np.asarray(rows, np.int64)
    data: dict[str, Any] = {}
    for column in columns(study):
        places = column.places(at)
        if column.numeric:
            data[column.head] = np.array(column.values, float)[places]
            if all(isinstance(value, int) for value in column.values):
                data[column.head] = data[column.head].astype(int)
        else:
            words = ["none" if value is None else str(value) for value in column.values]
            data[column.head] = pandas.Categorical.from_codes(places, words)
    for one in by:
        chosen = objective(one)
        data[chosen.label] = study.measure(chosen)[at]
    data["utilisation"] = study.utilisation[at]
    for name, places, words in _results(study, at):
        data[name] = pandas.Categorical.from_codes(places, words)
    made: pd.DataFrame = pandas.DataFrame(data, index=pandas.Index(at, name="row"))
    return made


def _results(study: Study, at: Rows) -> list[tuple[str, npt.NDArray[Any], list[str]]]:
    from tensionlib.whatif.study import WORDS

    checks = study.results.checks
    parts = list(dict.fromkeys(part for part, _ in checks))
    names = list(dict.fromkeys(name for _, name in checks))
    part_of = np.array([parts.index(part) for part, _ in checks] or [0], np.int16)
    name_of = np.array([names.index(name) for _, name in checks] or [0], np.int16)
    governing = study.results.governing[at]
    nowhere = study.verdict[at] == 0
    return [
        ("part", np.where(nowhere, -1, part_of[governing]), parts),
        ("governing check", np.where(nowhere, -1, name_of[governing]), names),
        ("verdict", study.verdict[at].astype(np.int16), list(WORDS.values())),
    ]


def write_parquet(study: Study, path: str | PathLike[str], by: Sequence[By]) -> Path:
    """Every row of a study as a Parquet file, a million rows at a time.

    The file appears whole or not at all.
    """
    pa, pq = need("pyarrow"), need("pyarrow.parquet")
    target = Path(path)
    if not target.parent.is_dir():
        raise InputError(f"path: {target.parent} is not a folder; give one that is there")
    held = columns(study)
    measures = [objective(one) for one in by]
    handle, name = tempfile.mkstemp(dir=target.parent, prefix=f".{target.name}.")
    os.close(handle)
    try:
        writer = None
        found = {one.label: study.measure(one) for one in measures}
        for start in range(0, len(study), ROWS_AT_ONCE):
            at = np.arange(start, min(start + ROWS_AT_ONCE, len(study)))
            data: dict[str, Any] = {"row": at}
            for column in held:
                places = column.places(at)
                if column.numeric:
                    data[column.head] = np.array(column.values, float)[places]
                else:
                    words = ["none" if value is None else str(value) for value in column.values]
                    data[column.head] = pa.DictionaryArray.from_arrays(places, words)
            data |= {label: values[at] for label, values in found.items()}
            data["utilisation"] = study.utilisation[at]
            for head, places, words in _results(study, at):
                kept = pa.array(places.astype(np.int16), mask=places < 0)
                data[head] = pa.DictionaryArray.from_arrays(kept, words)
            batch = pa.table(data)
            if writer is None:
                writer = pq.ParquetWriter(name, batch.schema)
            writer.write_table(batch)
        if writer is not None:
            writer.close()
        os.replace(name, target)
    except BaseException:
        Path(name).unlink(missing_ok=True)
        raise
    return target
