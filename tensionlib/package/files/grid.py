"""A schedule's cells as text, out of a delimited file or a workbook."""

from __future__ import annotations

import csv
import datetime
import io
import re
import warnings
import zipfile
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import Any

from tensionlib.errors import did_you_mean
from tensionlib.package.files.reading import LARGEST_FILE, UnreadableError

DELIMITED = (".csv", ".tsv", ".txt")
WORKBOOK = (".xlsx",)

_DELIMITERS = (",", ";", "\t")


@dataclass(frozen=True)
class Cell:
    """The text of a cell without blanks round it, or why it has none that can be trusted."""

    text: str
    trouble: str = ""


Row = tuple[int, list[Cell]]


def read_delimited(text: str, recognises: Callable[[str], bool]) -> list[Row]:
    """The rows of a delimited file that are not blank, by their number as a spreadsheet counts.

    The delimiter is the one of comma, semicolon and tab under which most of the headers are
    recognised.
    """

    def known(delimiter: str) -> int:
        try:
            first: list[Cell] = next((cells for _, cells in _records(text, delimiter)), [])
        except UnreadableError:
            return 0
        return sum(recognises(cell.text) for cell in first)

    return list(_records(text, max(_DELIMITERS, key=known)))


def _records(text: str, delimiter: str) -> Iterator[Row]:
    reader = csv.reader(io.StringIO(text, newline=""), delimiter=delimiter, strict=True)
    number = 0
    while True:
        number += 1
        try:
            record = next(reader)
        except StopIteration:
            return
        except csv.Error as error:
            raise UnreadableError(_csv_reason(str(error)), number) from None
        if any(cell.strip() for cell in record):
            yield number, [Cell(cell.strip()) for cell in record]


def _csv_reason(message: str) -> str:
    if "unexpected end of data" in message:
        return "a quotation mark that opens a cell is never closed"
    if "expected after" in message:
        return (
            "text follows the quotation mark that closes a cell; double the quotation marks inside"
            ' a cell in quotation marks, for example "3/4"" plate"'
        )
    return f"cannot be read ({message})"


def read_workbook(data: bytes, sheet: str) -> list[Row]:
    """The rows of one sheet (the first unless named) that are not blank, by their number."""
    values, formulas = _sheets(data, sheet)
    covered = _covered(values)
    rows: list[Row] = []
    for number, row in enumerate(values.iter_rows(), start=1):
        cells = []
        for cell in row:
            place = (cell.row, cell.column)
            formula = formulas.cell(*place).data_type == "f"
            if place in covered:
                trouble = (
                    f"cell {cell.coordinate} is part of the merged cells {covered[place]};"
                    " take the merge apart and fill each cell"
                )
                cells.append(Cell("", trouble))
            else:
                cells.append(_cell(cell, formula))
        if any(cell.text or cell.trouble for cell in cells):
            rows.append((number, cells))
    return rows


def _sheets(data: bytes, sheet: str) -> tuple[Any, Any]:
    """The sheet with the values last calculated, and the same with the formulas."""
    try:
        import openpyxl
    except ImportError:
        raise UnreadableError(
            "needs openpyxl to be read; install tensionlib[package], or save it as CSV"
        ) from None
    try:
        with zipfile.ZipFile(io.BytesIO(data)) as archive:
            unpacked = sum(item.file_size for item in archive.infolist())
        if unpacked > 10 * LARGEST_FILE:
            raise UnreadableError(
                f"unpacks to {unpacked} bytes; at most {10 * LARGEST_FILE} are read"
            )
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")
            books = [
                openpyxl.load_workbook(io.BytesIO(data), data_only=data_only)
                for data_only in (True, False)
            ]
    except UnreadableError:
        raise
    except Exception as error:  # a damaged archive fails in many ways, all of them the file's
        raise UnreadableError(
            f"is no workbook that can be read ({type(error).__name__}); save it as .xlsx without a"
            " password, or as CSV"
        ) from None
    names = [one.title for one in books[0].worksheets]
    if not names:
        raise UnreadableError("holds no sheet with cells")
    if sheet and sheet not in names:
        raise UnreadableError(
            f"has no sheet {sheet!r}; it has {', '.join(map(repr, names))}."
            + did_you_mean(sheet, names)
        )
    name = sheet or names[0]
    return books[0][name], books[1][name]


def _covered(sheet: Any) -> dict[tuple[int, int], str]:
    """The cells that a merge hides, where the cell that is shown holds something."""
    covered = {}
    for merged in sheet.merged_cells.ranges:
        first = (merged.min_row, merged.min_col)
        if sheet.cell(*first).value is None:
            continue
        for row in range(merged.min_row, merged.max_row + 1):
            for column in range(merged.min_col, merged.max_col + 1):
                if (row, column) != first:
                    covered[row, column] = str(merged)
    return covered


def _cell(cell: Any, formula: bool) -> Cell:
    value = cell.value
    if formula and value is None and cell.data_type == "n":
        return Cell(
            "",
            f"cell {cell.coordinate} holds a formula whose value was never calculated; open the"
            " file in a spreadsheet and save it, or write the value",
        )
    if value is None:
        return Cell("")
    if cell.data_type == "e":
        return Cell(str(value), f"cell {cell.coordinate} holds the error {value}")
    if isinstance(value, datetime.date | datetime.time | datetime.timedelta):
        return Cell(
            str(value),
            f"cell {cell.coordinate} holds a date or a time ({value}), often made by the"
            " spreadsheet of what was typed; set the cell to text and type it again",
        )
    if isinstance(value, bool):
        return Cell(str(value).upper())
    if isinstance(value, int | float):
        # Fifteen figures are what a spreadsheet keeps; "000" is a number shown with leading zeros.
        text = f"{value:.15g}"
        if re.fullmatch("0{2,}", cell.number_format) and text.isdigit():
            text = text.zfill(len(cell.number_format))
        return Cell(text)
    return Cell(str(value).strip())
