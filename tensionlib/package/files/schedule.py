"""A schedule of members: headers, rows, and every problem there is in them."""

from __future__ import annotations

import os
import re
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import Any

from tensionlib.errors import InputError, TensionlibError, UnitError, did_you_mean
from tensionlib.package.files.fields import (
    FORCE_EXAMPLE,
    LENGTH_EXAMPLE,
    KnownNames,
    named,
    take_force,
    take_length,
    text_block,
)
from tensionlib.package.files.grid import (
    DELIMITED,
    WORKBOOK,
    Cell,
    Row,
    read_delimited,
    read_workbook,
)
from tensionlib.package.files.problems import Problem, ScheduleError, in_order, reason_of, shown
from tensionlib.package.files.reading import UnreadableError, decode, read_bytes
from tensionlib.package.files.records import EndDetail, MemberRow, ScheduleRows
from tensionlib.quantities import FORCE, LENGTH, Quantity, parse
from tensionlib.quantities.unitnames import read_unit

# Column, and the headers it is known by besides its own name.
COLUMNS: dict[str, tuple[str, ...]] = {
    "mark": (),
    "title": ("note",),
    "section": (),
    "steel": (),
    "length": (),
    "force": (),
    "service_force": (),
    "end": (),
    "end_1": ("start end",),
    "end_2": ("far end",),
    "standard": (),
}
REQUIRED = ("mark", "section", "steel", "length", "force")
ENDS = ("end", "end_1", "end_2")
DEFAULTS = ("title", "section", "steel", "length", *ENDS, "standard")
QUANTITIES = {"length": LENGTH, "force": FORCE, "service_force": FORCE}

_UNITS = {"length": "mm", "force": "kN", "service_force": "kN"}
_WRITE = {
    "mark": "the member's mark, for example 'RB1'",
    "section": "a designation, for example '150x90x10 UA'",
    "steel": "a grade, for example 'AS/NZS 3679.1 300'",
    "length": f"a length, for example {LENGTH_EXAMPLE!r}",
    "force": f"the tension force, for example {FORCE_EXAMPLE!r}, or '0 kN' for none",
    **dict.fromkeys(ENDS, "the name of an end"),
}

_WITH_UNIT = re.compile(r"(?P<name>.*?)\s*(?:\[(?P<a>[^\]]*)\]|\((?P<b>[^)]*)\)|,(?P<c>[^,]*))\s*")
_NUMBER_IN_FRONT = re.compile(r"\A[\s\d.,/+\-\u2212\u00d7*\u00b7^]*(?:[eE][-+\u2212]?\d+)?\s*")


def read_schedule(
    path: str | os.PathLike[str],
    *,
    ends: Mapping[str, EndDetail],
    defaults: Mapping[str, str | Quantity] | None = None,
    columns: Mapping[str, str] | None = None,
    ignore: Iterable[str] = (),
    sheet: str = "",
    strict: bool = True,
    known: KnownNames | None = None,
) -> ScheduleRows:
    """Read a schedule of members from a CSV file or an XLSX workbook.

    Parameters
    ----------
    path : path
        ".csv", ".tsv" or ".txt" (comma, semicolon or tab between cells; UTF-8, or UTF-16 with its
        mark), or ".xlsx".
    ends : mapping of str to EndDetail
        The end connections that the end columns name.
    defaults : mapping, optional
        What an empty cell or a missing column stands for: title, section, steel, length, end,
        end_1, end_2, standard. A mark and a force are never taken from here.
    columns : mapping of str to str, optional
        Column of this library to the header the file has for it.
    ignore : iterable of str
        Headers that are not read.
    sheet : str
        Of a workbook; the first unless given.
    strict : bool
        Raise when anything is wrong. Otherwise give good rows and problems.
    known : KnownNames, optional
        What decides whether a section, steel or standard is known; the library's catalogues
        unless given.

    Raises
    ------
    ScheduleError
        With every problem, row by row.
    InputError, DataNotFoundError
        For `defaults` or `columns` that are no columns, or hold what is not known.
    """
    path = Path(path)
    known = known or KnownNames.of_library()
    defaults = _checked_arguments(defaults or {}, columns or {}, ends, known)
    read = rows_of(
        path,
        path.name,
        Setup(ends, defaults, columns or {}, tuple(ignore), sheet, known),
    )
    if strict and read.problems:
        raise ScheduleError(read.problems)
    return read


@dataclass(frozen=True)
class Setup:
    """What a schedule is read with.

    An end or a default that is None is known but was found bad elsewhere: a row that needs it is
    not good, and no further problem is told.
    """

    ends: Mapping[str, EndDetail | None]
    defaults: Mapping[str, str | Quantity | None]
    columns: Mapping[str, str]
    ignore: tuple[str, ...]
    sheet: str
    known: KnownNames
    marks: Mapping[str, str] = field(default_factory=dict)
    """Marks that are given elsewhere, and where."""


@dataclass(frozen=True)
class _Heading:
    """A column of the file that is read: where it stands, what it is, what the header says."""

    place: int
    column: str
    text: str
    unit: str = ""


def rows_of(path: Path, name: str, setup: Setup) -> ScheduleRows:
    """Read a schedule that problems and origins call `name`."""
    try:
        grid = _grid(path, setup)
    except UnreadableError as error:
        problem = Problem(name, error.line, "", "", error.reason, "row")
        return ScheduleRows((), (problem,))
    return _Reader(name, setup).read(grid)


def _grid(path: Path, setup: Setup) -> list[Row]:
    suffix = path.suffix.lower()
    if suffix not in DELIMITED + WORKBOOK:
        raise UnreadableError(
            f"a schedule is read from {', '.join(DELIMITED + WORKBOOK)}; save it as one of these"
        )
    data = read_bytes(path)
    if suffix in WORKBOOK:
        return read_workbook(data, setup.sheet)
    if setup.sheet:
        raise UnreadableError(f"sheet {setup.sheet!r} is asked for, and only a workbook has sheets")
    headers = _Headers(setup)
    return read_delimited(decode(data, utf16=True), headers.recognises)


def _folded(header: str) -> str:
    return " ".join(re.sub(r"[\s_-]+", " ", header).split()).casefold()


class _Headers:
    """Finds the column that a header names."""

    def __init__(self, setup: Setup) -> None:
        self._names = {_folded(column): column for column in COLUMNS}
        for column, others in COLUMNS.items():
            self._names |= {other: column for other in others}
        self._names |= {_folded(header): column for column, header in setup.columns.items()}
        self._ignored = {_folded(header) for header in setup.ignore}
        self.accepted = [*COLUMNS, *setup.columns.values()]

    def ignores(self, header: str) -> bool:
        return _folded(header) in self._ignored

    def recognises(self, header: str) -> bool:
        return self.ignores(header) or self.column(header) is not None

    def column(self, header: str) -> tuple[str, str] | None:
        """The column and the unit that a header states."""
        name, unit = split_unit(header)
        column = self._names.get(_folded(header))
        if column is not None:
            # A mapped header may hold brackets that are no unit: "force (ULS)".
            return column, unit if column in QUANTITIES and _is_unit_of(column, unit) else ""
        column = self._names.get(_folded(name))
        return (column, unit) if column in QUANTITIES else None


def split_unit(header: str) -> tuple[str, str]:
    """Part "force [kN]", "force (kN)" or "force, kN" into the name and the unit."""
    found = _WITH_UNIT.fullmatch(header)
    if found is None:
        return header, ""
    return found["name"], (found["a"] or found["b"] or found["c"] or "").strip()


class _Reader:
    def __init__(self, name: str, setup: Setup) -> None:
        self._name = name
        self._setup = setup
        self._problems: list[Problem] = []
        self._top = 1
        self._headings: dict[str, _Heading] = {}
        self._lost: set[str] = set()
        """Columns that no row can take from: told once, at the header."""

    def read(self, grid: list[Row]) -> ScheduleRows:
        if not grid:
            self._tell(None, "", "", f"is empty; the first row holds the headers {_due()}")
            return self._result([])
        self._top, header = grid[0]
        below = grid[1:]
        self._read_headers(header, below)
        self._check_mapped(header)
        ends = self._end_columns()
        required = (*REQUIRED, *ends)
        self._check_required(required)
        self._check_units(below)
        if not below:
            self._tell(None, "", "", "holds headers and no row below them")
        rows_of_mark: dict[str, list[int]] = {}
        for number, cells in below:
            rows_of_mark.setdefault(self._cell("mark", cells).text, []).append(number)
        rows = []
        for number, cells in below:
            row = self._row(number, cells, len(header), required, rows_of_mark)
            if row is not None:
                rows.append(row)
        return self._result(rows)

    def _result(self, rows: list[MemberRow]) -> ScheduleRows:
        return ScheduleRows(tuple(rows), tuple(in_order(self._problems)))

    def _tell(self, row: int | None, column: str, value: str, reason: str) -> None:
        self._problems.append(Problem(self._name, row, column, value, reason, "row"))

    def _cell(self, column: str, cells: list[Cell]) -> Cell:
        heading = self._headings.get(column)
        if heading is None or len(cells) <= heading.place:
            return Cell("")
        return cells[heading.place]

    # Headers

    def _read_headers(self, header: list[Cell], below: list[Row]) -> None:
        headers = _Headers(self._setup)
        for place, cell in enumerate(header):
            if cell.trouble:
                self._tell(self._top, cell.text, "", cell.trouble)
            elif not cell.text:
                if any(cells[place].text for _, cells in below if len(cells) > place):
                    self._tell(
                        self._top,
                        "",
                        "",
                        f"column {place + 1} has entries and no header; name it, or clear it",
                    )
            elif not headers.ignores(cell.text):
                self._read_header(place, cell.text, headers)

    def _read_header(self, place: int, text: str, headers: _Headers) -> None:
        found = headers.column(text)
        if found is None:
            name = split_unit(text)[0]
            near = did_you_mean(name, headers.accepted)
            # A misspelt column may hold what the rows would be taken without.
            self._lost.update(column for column in COLUMNS if did_you_mean(name, [column]))
            self._tell(
                self._top,
                text,
                shown(text),
                "unknown column."
                + (near or f" Columns are {', '.join(COLUMNS)}.")
                + " Rename it, give it under [schedule.columns], or list it under ignore",
            )
            return
        column, unit = found
        if column in self._headings:
            self._lost.add(column)
            self._tell(
                self._top,
                text,
                shown(text),
                f"a second column for {column!r}; {self._headings[column].text!r} is one already",
            )
            return
        self._headings[column] = _Heading(place, column, text, unit)
        if unit and not _is_unit_of(column, unit):
            self._lost.add(column)
            self._tell(
                self._top,
                text,
                shown(text),
                f"{unit!r} is no unit of {column}; head the column {_header(column)!r}",
            )

    def _check_mapped(self, header: list[Cell]) -> None:
        texts = [cell.text for cell in header if cell.text]
        there = {_folded(one) for text in texts for one in (text, split_unit(text)[0])}
        for column, wanted in self._setup.columns.items():
            if _folded(wanted) not in there:
                self._lost.add(column)
                self._tell(
                    self._top,
                    column,
                    "",
                    f"no header reads {wanted!r}." + did_you_mean(wanted, texts),
                )

    def _end_columns(self) -> tuple[str, ...]:
        """The columns that give the ends: one for both, or two."""
        two = [column for column in ("end_1", "end_2") if column in self._headings]
        if two and "end" in self._headings:
            self._lost.add("end")
            self._tell(
                self._top,
                self._headings["end"].text,
                "",
                f"stands beside {self._headings[two[0]].text!r}; keep 'end' for both ends alike,"
                " or 'end_1' and 'end_2'",
            )
            return ("end",)
        from_defaults = "end" not in self._headings and "end" not in self._setup.defaults
        if two or (from_defaults and {"end_1", "end_2"} & set(self._setup.defaults)):
            return ("end_1", "end_2")
        return ("end",)

    def _default(self, column: str) -> tuple[bool, str | Quantity | None]:
        """Whether a column has a default, and the default; that of `end` serves each end."""
        defaults = self._setup.defaults
        for name in (column, "end") if column in ("end_1", "end_2") else (column,):
            if name in defaults:
                return True, defaults[name]
        return False, None

    def _check_required(self, required: tuple[str, ...]) -> None:
        for column in required:
            if column in self._headings or self._default(column)[0]:
                continue
            if column in self._setup.columns:
                continue  # told where its header was not found
            self._lost.add(column)
            reason = f"missing; add a column headed {_header(column)!r}"
            if column == "end":
                reason += ", or two headed 'end_1' and 'end_2'"
            if column in DEFAULTS:
                reason += f", or give {column} under [schedule.defaults]"
            self._tell(self._top, column, "", reason)

    def _check_units(self, below: list[Row]) -> None:
        """Tell once when neither the header nor any cell of a column has a unit."""
        for column in QUANTITIES:
            heading = self._headings.get(column)
            if heading is None or heading.unit or column in self._lost:
                continue
            texts = [text for _, cells in below if (text := self._cell(column, cells).text)]
            if texts and all(map(_is_bare, texts)):
                self._lost.add(column)
                self._tell(self._top, heading.text, shown(texts[0]), _no_unit(column, texts[0]))

    # Rows

    def _row(
        self,
        number: int,
        cells: list[Cell],
        width: int,
        required: tuple[str, ...],
        rows_of_mark: Mapping[str, list[int]],
    ) -> MemberRow | None:
        if any(cell.text for cell in cells[width:]):
            self._tell(
                number,
                "",
                "",
                f"has {len(cells)} cells under {width} headers; put a text that holds the"
                " separator in quotation marks, and write decimals with a point",
            )
            return None
        good = not self._lost
        taken: dict[str, Any] = {}
        for column in (*required, "title", "standard", "service_force"):
            if column in self._lost:
                continue
            cell = self._cell(column, cells)
            try:
                taken[column] = self._take(column, cell, column in required)
                if column == "mark":
                    self._only_once(cell.text, rows_of_mark[cell.text])
            except TensionlibError as error:
                heading = self._headings.get(column)
                self._tell(
                    number,
                    heading.text if heading else column,
                    shown(cell.text) if cell.text else "",
                    reason_of(error, column),
                )
                good = False
        if not good or None in taken.values():
            return None
        return MemberRow(
            mark=taken["mark"],
            title=taken["title"],
            section=taken["section"],
            steel=taken["steel"],
            length=taken["length"],
            force=taken["force"],
            end_1=taken["end_1"] if "end_1" in taken else taken["end"],
            end_2=taken["end_2"] if "end_2" in taken else taken["end"],
            origin=f"{self._name} row {number}",
            standard=taken["standard"],
            service_force=None if taken["service_force"] == "" else taken["service_force"],
        )

    def _take(self, column: str, cell: Cell, required: bool) -> object:
        """What a cell, or the default for an empty one, says; None for a spoilt default or end."""
        if cell.trouble:
            raise InputError(cell.trouble)
        text: str | Quantity | None = cell.text
        if not text:
            there, text = self._default(column)
            if not there:
                if required:
                    raise InputError(f"is empty; write {_WRITE[column]}")
                return ""
        if not isinstance(text, str):
            return text
        if column in QUANTITIES:
            return self._quantity(column, text)
        if column == "title":
            return text_block(text)
        named(text)
        if column in ENDS:
            return _end_named(text, self._setup.ends)
        self._setup.known.check(column, text)
        return text

    def _quantity(self, column: str, text: str) -> Quantity:
        heading = self._headings.get(column)
        unit = heading.unit if heading else ""
        if _is_bare(text):
            if not unit:
                raise InputError(_no_unit(column, text))
            text = f"{text} {unit}"
        elif heading is not None and unit:
            own = _NUMBER_IN_FRONT.sub("", text, count=1)
            if _is_unit_of(column, own) and read_unit(own).size != read_unit(unit).size:
                raise InputError(
                    f"got {shown(text)} under the header {heading.text!r}; one unit is due, so"
                    " write the number alone, or take the unit out of the header"
                )
        return take_length(column, text) if column == "length" else take_force(column, text)

    def _only_once(self, mark: str, rows: list[int]) -> None:
        elsewhere = self._setup.marks.get(mark)
        if elsewhere:
            raise InputError(f"{mark!r} is the mark of the member at {elsewhere} too")
        if len(rows) > 1:
            more = f" and {len(rows) - 5} more" if len(rows) > 5 else ""
            raise InputError(f"{mark!r} is the mark of rows {', '.join(map(str, rows[:5]))}{more}")


def _end_named(name: str, ends: Mapping[str, EndDetail | None]) -> EndDetail | None:
    if name not in ends:
        raise InputError(no_end(name, ends))
    return ends[name]


def no_end(name: str, ends: Iterable[str]) -> str:
    """Say that no end has a name, and which names there are."""
    there = list(ends)
    known = f"ends are {', '.join(map(repr, there))}." if there else "no end is given."
    return f"no end is named {shown(name)}; {known}" + did_you_mean(name, there)


def _is_bare(text: str) -> bool:
    """Whether text is a number that lacks nothing but a unit."""
    try:
        return parse(f"{text} mm").role is LENGTH
    except (InputError, UnitError):
        return False


def _is_unit_of(column: str, unit: str) -> bool:
    try:
        return read_unit(unit).role.exponents == QUANTITIES[column].exponents
    except InputError:
        return False


def _no_unit(column: str, text: str) -> str:
    unit = _UNITS[column]
    return (
        f"neither the header nor the cell {shown(text)} has a unit; head the column"
        f" {_header(column)!r}, or write the cell as '{text} {unit}'"
    )


def _header(column: str) -> str:
    return f"{column} [{_UNITS[column]}]" if column in QUANTITIES else column


def _due() -> str:
    return ", ".join(_header(column) for column in (*REQUIRED, "end"))


def _checked_arguments(
    defaults: Mapping[str, str | Quantity],
    columns: Mapping[str, str],
    ends: Mapping[str, EndDetail],
    known: KnownNames,
) -> dict[str, str | Quantity]:
    """The defaults; refuses defaults and columns that are wrong whatever the file holds."""
    for argument, given, accepted in (
        ("defaults", defaults, DEFAULTS),
        ("columns", columns, tuple(COLUMNS)),
    ):
        for column in given:
            if column not in accepted:
                raise InputError(
                    f"{argument}: {column!r} is none of {', '.join(accepted)}."
                    + did_you_mean(column, accepted)
                )
    checked: dict[str, str | Quantity] = {}
    for column, value in defaults.items():
        try:
            if column == "length":
                value = take_length(column, value)
            elif not isinstance(value, str):
                raise InputError(f"got {value!r}; text is due")
            elif column in ENDS:
                _end_named(value, ends)
            else:
                known.check(column, value)
        except TensionlibError as error:
            raise type(error)(f"defaults: {column}: {reason_of(error, column)}") from None
        checked[column] = value
    return checked
