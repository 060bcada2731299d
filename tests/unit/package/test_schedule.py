"""A schedule gives good rows and every problem, whatever file it comes in."""

from __future__ import annotations

import csv
import datetime
import io
import pickle
import warnings
import zipfile
from collections.abc import Callable, Mapping
from pathlib import Path
from typing import Any

import openpyxl
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.package.files import (
    LARGEST_FILE,
    EndDetail,
    KnownNames,
    MemberRow,
    ScheduleError,
    ScheduleRows,
    read_schedule,
    reading,
)
from tensionlib.package.files.schedule import Setup, rows_of, split_unit
from tensionlib.quantities import LENGTH, door


def _only(*names: str) -> Callable[[str], None]:
    def look_up(name: str) -> None:
        if name not in names:
            raise DataNotFoundError(f"{name!r} is not known.{did_you_mean(name, names)}")

    return look_up


UA, EA, STEEL = "150x90x10 UA", "100x100x8 EA", "AS/NZS 3679.1 300"
KNOWN = KnownNames(
    section=_only(UA, EA),
    steel=_only(STEEL),
    bolts=_only(),
    metal=_only(),
    standard=_only("NZS 3404"),
)


def _end(name: str) -> EndDetail:
    plate = (("thickness", door("thickness", "12 mm", LENGTH)), ("steel", "AS/NZS 3678 250"))
    return EndDetail(name, "bolted", (("to", "long leg"),), plate)


ENDS = {"A": _end("A"), "bolted 3M20": _end("bolted 3M20")}

HEAD = ("mark", "section", "steel", "length [m]", "force [kN]", "end")
GOOD = ("RB1", UA, STEEL, "4.6", "285", "A")


def _csv(*rows: tuple[str, ...], delimiter: str = ",") -> str:
    out = io.StringIO(newline="")
    csv.writer(out, delimiter=delimiter).writerows(rows)
    return out.getvalue()


def _row(**changes: str) -> tuple[str, ...]:
    values = dict(zip(("mark", "section", "steel", "length", "force", "end"), GOOD, strict=True))
    return tuple((values | changes).values())


def _head(**changes: str) -> tuple[str, ...]:
    values = dict(zip(("mark", "section", "steel", "length", "force", "end"), HEAD, strict=True))
    return tuple((values | changes).values())


def _read(
    folder: Path, data: str | bytes, name: str = "members.csv", **kwargs: Any
) -> ScheduleRows:
    path = folder / name
    path.write_bytes(data if isinstance(data, bytes) else data.encode())
    return read_schedule(path, ends=ENDS, known=KNOWN, **({"strict": False} | kwargs))


def _problems(read: ScheduleRows) -> list[str]:
    return [str(problem) for problem in read.problems]


# Good files


def test_a_row_is_typed_and_says_where_it_stands(tmp_path: Path) -> None:
    read = _read(tmp_path, _csv(HEAD, GOOD), strict=True)
    [row] = read.rows
    assert (row.mark, row.title, row.section, row.steel, row.standard) == ("RB1", "", UA, STEEL, "")
    assert (row.length.internal, row.force.internal) == (4600.0, 285_000.0)
    assert (row.end_1, row.end_2) == (ENDS["A"], ENDS["A"])
    assert row.origin == "members.csv row 2"
    assert pickle.loads(pickle.dumps(row)) == row


@pytest.mark.parametrize(
    ("length", "force"),
    [
        ("length [m]", "force [kN]"),
        ("LENGTH (m)", "Force (kN)"),
        ("length, m", "force, kN"),
        ("  Length[m] ", " force  [ kN ]"),
    ],
)
def test_the_unit_may_stand_in_the_header(tmp_path: Path, length: str, force: str) -> None:
    [row] = _read(tmp_path, _csv(_head(length=length, force=force), GOOD), strict=True).rows
    assert (row.length.internal, row.force.internal) == (4600.0, 285_000.0)


def test_the_unit_may_stand_in_the_cells(tmp_path: Path) -> None:
    head = _head(length="length", force="force")
    rows = [
        _row(length="4.6 m", force="285 kN"),
        _row(mark="RB2", length="15 ft", force="64 kip"),
        _row(mark="RB3", length="180 3/4 in", force="0 N"),
    ]
    read = _read(tmp_path, _csv(head, *rows), strict=True)
    assert [row.length.internal for row in read.rows] == [4600.0, 4572.0, 4591.05]
    assert [row.force.internal for row in read.rows] == pytest.approx([285e3, 284686.18, 0.0])


def test_header_and_cell_may_say_the_same_unit(tmp_path: Path) -> None:
    read = _read(tmp_path, _csv(HEAD, _row(length="4.6 m", force="285kN")), strict=True)
    assert (read.rows[0].length.internal, read.rows[0].force.internal) == (4600.0, 285_000.0)


def test_zero_force_is_a_row(tmp_path: Path) -> None:
    assert _read(tmp_path, _csv(HEAD, _row(force="0")), strict=True).rows[0].force.internal == 0.0


@pytest.mark.parametrize("mark", ["1e3", "007", "NaN", "NA", "TRUE", "1-2", "=A1", "<b>&#x", "Ø12"])
def test_a_mark_is_text_to_the_letter(tmp_path: Path, mark: str) -> None:
    assert _read(tmp_path, _csv(HEAD, _row(mark=mark)), strict=True).rows[0].mark == mark


def test_two_ends_titles_and_standards(tmp_path: Path) -> None:
    head = ("Start End", "FAR_END", "note", "Standard", *HEAD[:-1])
    row = ("A", "bolted 3M20", "brace, grid B\nand C", "NZS 3404", *GOOD[:-1])
    [read] = _read(tmp_path, _csv(head, row), strict=True).rows
    assert (read.end_1.name, read.end_2.name) == ("A", "bolted 3M20")
    assert (read.title, read.standard) == ("brace, grid B\nand C", "NZS 3404")


def test_blank_rows_are_skipped_and_counted(tmp_path: Path) -> None:
    text = "\n\n" + _csv(HEAD, GOOD) + "\n , ,,,,\n" + _csv(_row(mark="RB2"))
    assert [row.origin for row in _read(tmp_path, text, strict=True).rows] == [
        "members.csv row 4",
        "members.csv row 7",
    ]


def test_a_cell_of_two_lines_is_one_row(tmp_path: Path) -> None:
    head = (*HEAD, "title")
    text = _csv(head, (*GOOD, "one\ntwo"), (*_row(mark="RB2"), ""))
    assert [r.origin for r in _read(tmp_path, text, strict=True).rows] == [
        "members.csv row 2",
        "members.csv row 3",
    ]


@pytest.mark.parametrize(
    "encode",
    [
        lambda text: text.encode(),
        lambda text: b"\xef\xbb\xbf" + text.encode(),
        lambda text: text.encode("utf-16"),
        lambda text: b"\xfe\xff" + text.encode("utf-16-be"),
        lambda text: text.replace("\r\n", "\n").encode(),
        lambda text: text.replace("\r\n", "\r").encode(),
        lambda text: text.rstrip().encode(),
    ],
    ids=["utf-8", "utf-8 mark", "utf-16", "utf-16 big end", "LF", "CR", "no last line end"],
)
@pytest.mark.parametrize("delimiter", [",", ";", "\t"])
def test_every_ordinary_way_of_writing(
    tmp_path: Path, encode: Callable[[str], bytes], delimiter: str
) -> None:
    head = (*_head(length="length, m"), "title")
    text = _csv(head, (*GOOD, "ψ, grid; B"), delimiter=delimiter)
    [row] = _read(tmp_path, encode(text), strict=True).rows
    assert (row.mark, row.title, row.length.internal) == ("RB1", "ψ, grid; B", 4600.0)


def test_a_quoted_header_does_not_hide_the_delimiter(tmp_path: Path) -> None:
    text = "\n".join('"' + '","'.join(line) + '"' for line in (HEAD, GOOD))
    assert _read(tmp_path, text, strict=True).rows[0].mark == "RB1"


def test_mapped_ignored_and_defaulted_columns(tmp_path: Path) -> None:
    text = _csv(("Ref", "N star [kN]", "Mass"), ("RB1", "285", "64"), ("RB2", "0", "65"))
    read = _read(
        tmp_path,
        text,
        strict=True,
        columns={"mark": "ref", "force": "N Star"},
        ignore=["mass"],
        defaults={
            "section": UA,
            "steel": STEEL,
            "length": "4.6 m",
            "end_1": "A",
            "end": "bolted 3M20",
        },
    )
    assert [(row.mark, row.force.internal, row.length.internal) for row in read.rows] == [
        ("RB1", 285_000.0, 4600.0),
        ("RB2", 0.0, 4600.0),
    ]
    assert read.rows[0].end_1.name == read.rows[0].end_2.name == "bolted 3M20"


@pytest.mark.parametrize("header", ["N* (ULS) [kN]", "Force (ULS)", "n* (uls)"])
def test_a_mapped_header_may_hold_brackets(tmp_path: Path, header: str) -> None:
    force = "285" if header.endswith("[kN]") else "285 kN"
    mapped = "N* (ULS)" if header.startswith("n") else header
    read = _read(
        tmp_path,
        _csv(_head(force=header), _row(force=force)),
        strict=True,
        columns={"force": mapped},
    )
    assert read.rows[0].force.internal == 285_000.0


def test_a_default_length_has_its_own_unit(tmp_path: Path) -> None:
    read = _read(tmp_path, _csv(HEAD, _row(length="")), strict=True, defaults={"length": "15 ft"})
    assert read.rows[0].length.internal == 4572.0


def test_a_mark_of_very_many_rows_is_told_shortly(tmp_path: Path) -> None:
    read = _read(tmp_path, _csv(HEAD, *[GOOD] * 2000))
    assert read.problems[0].reason == "'RB1' is the mark of rows 2, 3, 4, 5, 6 and 1995 more"
    assert len(read.problems) == 2000


def test_a_default_fills_empty_cells_only(tmp_path: Path) -> None:
    text = _csv(HEAD, _row(section=""), _row(mark="RB2"))
    read = _read(tmp_path, text, strict=True, defaults={"section": EA})
    assert [row.section for row in read.rows] == [EA, UA]


def test_two_default_ends_serve_without_a_column(tmp_path: Path) -> None:
    read = _read(
        tmp_path,
        _csv(HEAD[:-1], GOOD[:-1]),
        strict=True,
        defaults={"end_1": "A", "end_2": "bolted 3M20"},
    )
    assert [read.rows[0].end_1.name, read.rows[0].end_2.name] == ["A", "bolted 3M20"]


def test_good_rows_are_there_beside_bad_ones(tmp_path: Path) -> None:
    text = _csv(HEAD, GOOD, _row(mark="RB2", force="-1"), _row(mark="RB3"))
    read = _read(tmp_path, text)
    assert [row.mark for row in read.rows] == ["RB1", "RB3"]
    assert [(p.row, p.column, p.value) for p in read.problems] == [(3, "force [kN]", "'-1'")]


def test_strict_lists_every_problem(tmp_path: Path) -> None:
    text = _csv(
        HEAD, _row(section="150x90x11 UA", end="B"), _row(mark="RB2"), _row(mark="RB3", length="")
    )
    with pytest.raises(ScheduleError) as caught:
        _read(tmp_path, text, strict=True)
    assert str(caught.value) == (
        "3 problems:\n"
        "  members.csv, row 2, section: '150x90x11 UA' is not known."
        " Did you mean '150x90x10 UA'?\n"
        "  members.csv, row 2, end: no end is named 'B'; ends are 'A', 'bolted 3M20'.\n"
        "  members.csv, row 4, length [m]: is empty; write a length, for example '4.6 m'"
    )
    assert [problem.row for problem in caught.value.problems] == [2, 2, 4]
    assert isinstance(caught.value, InputError)
    again = pickle.loads(pickle.dumps(caught.value))
    assert (str(again), again.problems) == (str(caught.value), caught.value.problems)


# Bad cells

_COMPRESSION = (
    "a compression force; this tool designs tension, and compression enters only as the reversal"
    " case of a gusset. Give the tension force, for example '285 kN'"
)
_OTHER_UNIT = (
    "under the header 'force [kN]'; one unit is due, so write the number alone, or take the unit"
    " out of the header"
)
BAD_CELLS = [
    ({"mark": ""}, "mark: is empty; write the member's mark, for example 'RB1'"),
    ({"mark": "a\nb"}, "mark: got 'a\\nb'; one line of text without tabs is due"),
    (
        {"mark": "RB\x07"},
        "mark: holds the control character U+0007, which cannot be printed; take it out",
    ),
    ({"section": ""}, "section: is empty; write a designation, for example '150x90x10 UA'"),
    (
        {"section": "150x90x11 UA"},
        "section: '150x90x11 UA' is not known. Did you mean '150x90x10 UA'?",
    ),
    ({"steel": ""}, "steel: is empty; write a grade, for example 'AS/NZS 3679.1 300'"),
    (
        {"steel": "AS/NZS 3679.1 350"},
        "steel: 'AS/NZS 3679.1 350' is not known. Did you mean 'AS/NZS 3679.1 300'?",
    ),
    ({"end": ""}, "end: is empty; write the name of an end"),
    ({"end": "B"}, "end: no end is named 'B'; ends are 'A', 'bolted 3M20'."),
    (
        {"end": "bolted 3M2O"},
        "end: no end is named 'bolted 3M2O'; ends are 'A', 'bolted 3M20'."
        " Did you mean 'bolted 3M20'?",
    ),
    ({"length": ""}, "length [m]: is empty; write a length, for example '4.6 m'"),
    ({"length": "0"}, "length [m]: got 0 mm; it must be above 0 mm"),
    ({"length": "-4.6"}, "length [m]: got -4600 mm; it must be above 0 mm"),
    (
        {"length": "4600 mm"},
        "length [m]: got '4600 mm' under the header 'length [m]'; one unit is due, so write the"
        " number alone, or take the unit out of the header",
    ),
    (
        {"force": ""},
        "force [kN]: is empty; write the tension force, for example '285 kN', or '0 kN' for none",
    ),
    ({"force": "-285"}, f"force [kN]: got -285 kN, {_COMPRESSION}"),
    ({"force": "\u2212285"}, f"force [kN]: got -285 kN, {_COMPRESSION}"),
    ({"force": "-1e-3 kN"}, f"force [kN]: got -0.001 kN, {_COMPRESSION}"),
    ({"force": "285 N"}, f"force [kN]: got '285 N' {_OTHER_UNIT}"),
    ({"force": "64 kip"}, f"force [kN]: got '64 kip' {_OTHER_UNIT}"),
    (
        {"force": "285 mm"},
        "force [kN]: got '285 mm', a length; a force is due, for example '285 kN'",
    ),
]


@pytest.mark.parametrize(("changes", "message"), BAD_CELLS, ids=lambda value: str(value)[:40])
def test_a_bad_cell_is_told(tmp_path: Path, changes: dict[str, str], message: str) -> None:
    read = _read(tmp_path, _csv(HEAD, _row(**changes)))
    assert _problems(read) == [f"members.csv, row 2, {message}"]
    assert read.rows == ()


@pytest.mark.parametrize(
    "force",
    [
        "abc",
        "1,250",
        "4,6",
        "nan",
        "inf",
        "1 250",
        "1.250.000",
        "285 k N m",
        "285 kn",
        "12 ft 6 in",
        "-",
    ],
)
def test_what_is_no_number_is_told_as_it_stands(tmp_path: Path, force: str) -> None:
    [problem] = _read(tmp_path, _csv(HEAD, _row(force=force))).problems
    assert (problem.row, problem.column, problem.value) == (2, "force [kN]", repr(force))
    assert problem.reason.startswith(f"got {force!r}")


def test_all_bad_cells_of_a_row_are_told(tmp_path: Path) -> None:
    read = _read(tmp_path, _csv(HEAD, ("", "x", "y", "0", "-1", "z")))
    assert [p.column for p in read.problems] == [
        "mark",
        "section",
        "steel",
        "length [m]",
        "force [kN]",
        "end",
    ]


def test_one_mark_in_several_rows_makes_none_of_them_good(tmp_path: Path) -> None:
    text = _csv(HEAD, GOOD, _row(mark="RB2"), _row(mark=" RB1 "))
    read = _read(tmp_path, text)
    assert _problems(read) == [
        "members.csv, row 2, mark: 'RB1' is the mark of rows 2, 4",
        "members.csv, row 4, mark: 'RB1' is the mark of rows 2, 4",
    ]
    assert [row.mark for row in read.rows] == ["RB2"]


def test_a_row_with_too_many_cells_is_told(tmp_path: Path) -> None:
    text = ",".join(HEAD) + "\nRB1,150x90x10 UA,AS/NZS 3679.1 300,4,6,285,A\n"
    assert _problems(_read(tmp_path, text)) == [
        "members.csv, row 2: has 7 cells under 6 headers; put a text that holds the separator in"
        " quotation marks, and write decimals with a point"
    ]


def test_a_short_row_is_told_cell_by_cell(tmp_path: Path) -> None:
    read = _read(tmp_path, _csv(HEAD, GOOD[:4]))
    assert [problem.column for problem in read.problems] == ["force [kN]", "end"]


def test_a_cell_without_unit_among_cells_with_one_is_told_alone(tmp_path: Path) -> None:
    head = _head(force="force")
    read = _read(tmp_path, _csv(head, _row(force="285"), _row(mark="RB2", force="285 kN")))
    assert _problems(read) == [
        "members.csv, row 2, force: neither the header nor the cell '285' has a unit; head the"
        " column 'force [kN]', or write the cell as '285 kN'"
    ]
    assert [row.mark for row in read.rows] == ["RB2"]


# Bad headers

_RENAME = "Rename it, give it under [schedule.columns], or list it under ignore"
BAD_HEADS: list[tuple[tuple[str, ...], dict[str, Any], list[str]]] = [
    (
        _head(force="force"),
        {},
        [
            "row 1, force: neither the header nor the cell '285' has a unit; head the column"
            " 'force [kN]', or write the cell as '285 kN'"
        ],
    ),
    (
        _head(force="force [ULS]"),
        {},
        ["row 1, force [ULS]: 'ULS' is no unit of force; head the column 'force [kN]'"],
    ),
    (
        _head(length="length (kN)"),
        {},
        ["row 1, length (kN): 'kN' is no unit of length; head the column 'length [mm]'"],
    ),
    (
        _head(force="froce [kN]"),
        {},
        [
            f"row 1, froce [kN]: unknown column. Did you mean 'force'? {_RENAME}",
            "row 1, force: missing; add a column headed 'force [kN]'",
        ],
    ),
    (
        (*HEAD, "zzz"),
        {},
        [
            "row 1, zzz: unknown column. Columns are mark, title, section, steel, length, force,"
            f" service_force, end, end_1, end_2, standard. {_RENAME}"
        ],
    ),
    (
        _head(steel="section"),
        {},
        [
            "row 1, section: a second column for 'section'; 'section' is one already",
            "row 1, steel: missing; add a column headed 'steel', or give steel under"
            " [schedule.defaults]",
        ],
    ),
    (
        (*HEAD, "title", "note"),
        {},
        ["row 1, note: a second column for 'title'; 'title' is one already"],
    ),
    (
        _head(mark=""),
        {},
        [
            "row 1: column 1 has entries and no header; name it, or clear it",
            "row 1, mark: missing; add a column headed 'mark'",
        ],
    ),
    (
        (*HEAD, "end_1"),
        {},
        [
            "row 1, end: stands beside 'end_1'; keep 'end' for both ends alike, or 'end_1' and"
            " 'end_2'"
        ],
    ),
    (
        _head(end="end_2"),
        {},
        [
            "row 1, end_1: missing; add a column headed 'end_1', or give end_1 under"
            " [schedule.defaults]"
        ],
    ),
    (
        HEAD[:-1],
        {},
        [
            "row 1, end: missing; add a column headed 'end', or two headed 'end_1' and 'end_2', or"
            " give end under [schedule.defaults]"
        ],
    ),
    (
        HEAD,
        {"columns": {"force": "N star"}},
        ["row 1, force: no header reads 'N star'."],
    ),
    (
        _head(force="N staar [kN]"),
        {"columns": {"force": "N star"}},
        [
            f"row 1, N staar [kN]: unknown column. Did you mean 'N star' or 'standard'? {_RENAME}",
            "row 1, force: no header reads 'N star'. Did you mean 'N staar [kN]'?",
        ],
    ),
]


@pytest.mark.parametrize(
    ("head", "setup", "messages"), BAD_HEADS, ids=[str(case[2][0])[:50] for case in BAD_HEADS]
)
def test_a_bad_header_is_told_once(
    tmp_path: Path, head: tuple[str, ...], setup: dict[str, Any], messages: list[str]
) -> None:
    rows = [(*_row(mark=mark), *["A"] * 2)[: len(head)] for mark in ("RB1", "RB2")]
    read = _read(tmp_path, _csv(head, *rows), **setup)
    told = [text for text in _problems(read) if ", row 1" in text]
    assert told == [f"members.csv, {message}" for message in messages]


@pytest.mark.parametrize(
    "head", [_head(force="froce [kN]"), (*HEAD, "title", "titel"), (*HEAD, "end")]
)
def test_rows_are_not_good_without_a_column_that_may_be_theirs(
    tmp_path: Path, head: tuple[str, ...]
) -> None:
    assert _read(tmp_path, _csv(head, (*GOOD, "A", "A")[: len(head)])).rows == ()


def test_a_harmless_unknown_column_leaves_the_rows_good(tmp_path: Path) -> None:
    read = _read(tmp_path, _csv((*HEAD, "zzz"), (*GOOD, "1")))
    assert (len(read.rows), len(read.problems)) == (1, 1)


def test_an_end_that_is_bad_elsewhere_makes_no_row_and_no_problem(tmp_path: Path) -> None:
    path = tmp_path / "members.csv"
    path.write_text(_csv(HEAD, GOOD, _row(mark="RB2", end="B")))
    setup = Setup({"A": None, "B": ENDS["A"]}, {}, {}, (), "", KNOWN)
    read = rows_of(path, "members.csv", setup)
    assert ([row.mark for row in read.rows], read.problems) == (["RB2"], ())


# Bad files

BAD_FILES = [
    (
        b"",
        "members.csv",
        "members.csv: is empty; the first row holds the headers mark, section, steel, length [mm],"
        " force [kN], end",
    ),
    (_csv(HEAD).encode(), "members.csv", "members.csv: holds headers and no row below them"),
    (
        _csv(HEAD, GOOD).encode() + b"RB\xe9",
        "members.csv",
        "members.csv, row 3: byte 0xE9 is not UTF-8 text; save the file as UTF-8",
    ),
    (
        _csv(HEAD, GOOD).encode("utf-16-le"),
        "members.csv",
        "members.csv, row 1: holds a NUL character, so it is no plain text or UTF-16 without its"
        " mark; save it as UTF-8",
    ),
    (
        _csv(HEAD, GOOD).encode("utf-16")[:-1],
        "members.csv",
        "members.csv: is not whole UTF-16; save it again as UTF-8",
    ),
    (
        _csv(HEAD, GOOD).encode() + b'"RB2,x\n',
        "members.csv",
        "members.csv, row 3: a quotation mark that opens a cell is never closed",
    ),
    (
        _csv(HEAD, GOOD).encode() + b'"3/4" plate",x\n',
        "members.csv",
        "members.csv, row 3: text follows the quotation mark that closes a cell; double the"
        ' quotation marks inside a cell in quotation marks, for example "3/4"" plate"',
    ),
    (
        b"x",
        "members.xls",
        "members.xls: a schedule is read from .csv, .tsv, .txt, .xlsx; save it as one of these",
    ),
    (
        b"not a workbook",
        "members.xlsx",
        "members.xlsx: is no workbook that can be read (BadZipFile); save it as .xlsx without a"
        " password, or as CSV",
    ),
]


@pytest.mark.parametrize(("data", "name", "message"), BAD_FILES, ids=[c[2][:60] for c in BAD_FILES])
def test_a_bad_file_is_told(tmp_path: Path, data: bytes, name: str, message: str) -> None:
    read = _read(tmp_path, data, name)
    assert (_problems(read), read.rows) == ([message], ())
    with pytest.raises(ScheduleError) as caught:
        _read(tmp_path, data, name, strict=True)
    assert str(caught.value) == message


def test_a_missing_file_is_told_with_the_nearest_name(tmp_path: Path) -> None:
    (tmp_path / "members.csv").write_text("")
    with pytest.raises(ScheduleError) as caught:
        read_schedule(tmp_path / "member.csv", ends=ENDS, known=KNOWN)
    assert str(caught.value) == "member.csv: there is no such file. Did you mean 'members.csv'?"


def test_a_folder_is_told(tmp_path: Path) -> None:
    (tmp_path / "members.csv").mkdir()
    with pytest.raises(ScheduleError, match=r"^members\.csv: is a folder; name a file in it$"):
        read_schedule(tmp_path / "members.csv", ends=ENDS, known=KNOWN)


def test_a_huge_file_is_refused_unread(tmp_path: Path) -> None:
    path = tmp_path / "members.csv"
    with path.open("wb") as stream:
        stream.truncate(LARGEST_FILE + 1)
    with pytest.raises(ScheduleError) as caught:
        read_schedule(path, ends=ENDS, known=KNOWN)
    assert str(caught.value) == "members.csv: holds 20000001 bytes; at most 20000000 are read"


def test_a_workbook_that_unpacks_to_too_much_is_refused(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    path = tmp_path / "members.xlsx"
    with zipfile.ZipFile(path, "w", zipfile.ZIP_DEFLATED) as archive:
        archive.writestr("xl/worksheets/sheet1.xml", b"0" * (10 * LARGEST_FILE + 1))
    assert path.stat().st_size < LARGEST_FILE
    with pytest.raises(
        ScheduleError, match="unpacks to 200000001 bytes; at most 200000000 are read"
    ):
        read_schedule(path, ends=ENDS, known=KNOWN)


def test_a_sheet_is_asked_of_workbooks_only(tmp_path: Path) -> None:
    assert _problems(_read(tmp_path, _csv(HEAD, GOOD), sheet="Roof")) == [
        "members.csv: sheet 'Roof' is asked for, and only a workbook has sheets"
    ]


# Arguments

BAD_ARGUMENTS: list[tuple[dict[str, Mapping[str, str]], type[Exception], str]] = [
    (
        {"columns": {"froce": "N"}},
        InputError,
        "columns: 'froce' is none of mark, title, section, steel, length, force, service_force,"
        " end, end_1, end_2,"
        " standard. Did you mean 'force'?",
    ),
    (
        {"defaults": {"force": "0 kN"}},
        InputError,
        "defaults: 'force' is none of title, section, steel, length, end, end_1, end_2, standard.",
    ),
    (
        {"defaults": {"end": "B"}},
        InputError,
        "defaults: end: no end is named 'B'; ends are 'A', 'bolted 3M20'.",
    ),
    (
        {"defaults": {"section": "150x90x11 UA"}},
        DataNotFoundError,
        "defaults: section: '150x90x11 UA' is not known. Did you mean '150x90x10 UA'?",
    ),
]


@pytest.mark.parametrize(("arguments", "kind", "message"), BAD_ARGUMENTS)
def test_bad_arguments_are_refused(
    tmp_path: Path, arguments: dict[str, Any], kind: type[Exception], message: str
) -> None:
    with pytest.raises(kind) as caught:
        _read(tmp_path, _csv(HEAD, GOOD), **arguments)
    assert str(caught.value) == message


# Workbooks


def _workbook(
    folder: Path, *rows: tuple[Any, ...], change: Callable[[Any], None] | None = None
) -> Path:
    book = openpyxl.Workbook()
    sheet = book.active
    sheet.title = "Roof"
    for row in rows:
        sheet.append(row)
    if change is not None:
        change(sheet)
    path = folder / "members.xlsx"
    book.save(path)
    return path


def _from_workbook(path: Path, **kwargs: Any) -> ScheduleRows:
    with warnings.catch_warnings():
        warnings.simplefilter("error")
        return read_schedule(path, ends=ENDS, known=KNOWN, **({"strict": False} | kwargs))


def test_a_workbook_reads_as_the_csv_does(tmp_path: Path) -> None:
    head = (*HEAD, "title")
    path = _workbook(tmp_path, head, ("RB1", UA, STEEL, 4.6, 285, "A", " brace, grid B "))
    [row] = _from_workbook(path, strict=True).rows
    [same] = _read(tmp_path, _csv(head, (*GOOD, "brace, grid B")), strict=True).rows
    assert row.origin == "members.xlsx row 2"
    assert [getattr(row, f) for f in ("mark", "title", "section", "steel", "length", "force")] == [
        getattr(same, f) for f in ("mark", "title", "section", "steel", "length", "force")
    ]


def test_numbers_of_a_workbook_keep_what_they_show(tmp_path: Path) -> None:
    def change(sheet: Any) -> None:
        sheet["A3"].number_format = "000"

    path = _workbook(
        tmp_path,
        HEAD,
        (12, *GOOD[1:3], 0.1 + 0.2, 285.0, "A"),
        (7, *GOOD[1:3], 4.6, 0, "A"),
        ("1e3", *GOOD[1:]),
        (1.1 + 2.2, *GOOD[1:]),
        change=change,
    )
    rows = _from_workbook(path, strict=True).rows
    assert [row.mark for row in rows] == ["12", "007", "1e3", "3.3"]
    assert rows[0].length.internal == 300.0


def test_blank_rows_and_columns_of_a_workbook(tmp_path: Path) -> None:
    path = _workbook(tmp_path, (), (None, *HEAD), (), (None, *GOOD), (None, None, "  "))
    [row] = _from_workbook(path, strict=True).rows
    assert row.origin == "members.xlsx row 4"


def test_a_named_sheet_is_read_and_an_unknown_one_told(tmp_path: Path) -> None:
    path = _workbook(tmp_path, ("nothing",))
    book = openpyxl.load_workbook(path)
    sheet = book.create_sheet("Walls")
    for line in (HEAD, GOOD):
        sheet.append(line)
    book.save(path)
    assert _from_workbook(path, sheet="Walls", strict=True).rows[0].mark == "RB1"
    assert _problems(_from_workbook(path, sheet="Wals")) == [
        "members.xlsx: has no sheet 'Wals'; it has 'Roof', 'Walls'. Did you mean 'Walls'?"
    ]


BAD_WORKBOOK_CELLS = [
    (
        "E2",
        "=200+85",
        "force [kN]: cell E2 holds a formula whose value was never calculated; open the file in a"
        " spreadsheet and save it, or write the value",
    ),
    (
        "A2",
        datetime.datetime(2025, 2, 1),
        "mark: cell A2 holds a date or a time (2025-02-01 00:00:00), often made by the spreadsheet"
        " of what was typed; set the cell to text and type it again",
    ),
    ("E2", "#REF!", "force [kN]: cell E2 holds the error #REF!"),
]


@pytest.mark.parametrize(("cell", "value", "message"), BAD_WORKBOOK_CELLS)
def test_a_bad_cell_of_a_workbook_is_named(
    tmp_path: Path, cell: str, value: object, message: str
) -> None:
    def change(sheet: Any) -> None:
        sheet[cell] = value

    read = _from_workbook(_workbook(tmp_path, HEAD, GOOD, change=change))
    assert _problems(read) == [f"members.xlsx, row 2, {message}"]
    assert read.rows == ()


def test_a_merged_cell_is_named(tmp_path: Path) -> None:
    path = _workbook(
        tmp_path,
        HEAD,
        GOOD,
        (None, *GOOD[1:]),
        change=lambda sheet: sheet.merge_cells("A2:A3"),
    )
    read = _from_workbook(path)
    assert _problems(read) == [
        "members.xlsx, row 3, mark: cell A3 is part of the merged cells A2:A3; take the merge apart"
        " and fill each cell"
    ]
    assert [row.mark for row in read.rows] == ["RB1"]


def test_a_merged_header_is_named(tmp_path: Path) -> None:
    path = _workbook(tmp_path, HEAD, GOOD, change=lambda sheet: sheet.merge_cells("D1:E1"))
    assert _problems(_from_workbook(path))[0] == (
        "members.xlsx, row 1: cell E1 is part of the merged cells D1:E1; take the merge apart and"
        " fill each cell"
    )


def _with_value(path: Path, old: bytes, new: bytes) -> None:
    """Put a cell's XML in place of another, as a spreadsheet that calculates writes it."""
    with zipfile.ZipFile(path) as archive:
        parts = {name: archive.read(name) for name in archive.namelist()}
    sheet = "xl/worksheets/sheet1.xml"
    assert old in parts[sheet]
    parts[sheet] = parts[sheet].replace(old, new)
    with zipfile.ZipFile(path, "w") as archive:
        for name, data in parts.items():
            archive.writestr(name, data)


def test_a_formula_with_its_value_reads_as_the_value(tmp_path: Path) -> None:
    path = _workbook(tmp_path, HEAD, (*GOOD[:4], "=200+85", "A"))
    _with_value(path, b"<f>200+85</f><v />", b"<f>200+85</f><v>285</v>")
    assert _from_workbook(path, strict=True).rows[0].force.internal == 285_000.0


def test_a_formula_that_gives_blank_text_is_a_blank(tmp_path: Path) -> None:
    path = _workbook(tmp_path, (*HEAD, "title"), (*GOOD, '=""'))
    _with_value(path, b'<c r="G2"><f>""</f><v /></c>', b'<c r="G2" t="str"><f>""</f><v></v></c>')
    assert _from_workbook(path, strict=True).rows[0].title == ""


# Any text

_TEXT = st.text(
    st.characters(exclude_categories=["Cs", "Cc"], include_characters="\n\r\t,;\"'=|"), max_size=40
)


@settings(max_examples=300, deadline=None)
@given(
    titles=st.lists(_TEXT, min_size=1, max_size=4),
    delimiter=st.sampled_from([",", ";", "\t"]),
    encoding=st.sampled_from(["utf-8", "utf-8-sig", "utf-16"]),
)
def test_any_title_comes_back(
    tmp_path_factory: pytest.TempPathFactory, titles: list[str], delimiter: str, encoding: str
) -> None:
    rows = [(*_row(mark=f"RB{i}"), title) for i, title in enumerate(titles)]
    out = io.StringIO(newline="")
    csv.writer(out, delimiter=delimiter, quoting=csv.QUOTE_ALL).writerows([(*HEAD, "title"), *rows])
    read = _read(tmp_path_factory.mktemp("any"), out.getvalue().encode(encoding), strict=True)
    assert [row.title for row in read.rows] == [title.strip() for title in titles]


@settings(max_examples=200, deadline=None)
@given(
    mark=st.text(
        st.characters(exclude_categories=["Cs", "Cc", "Zl", "Zp"]), min_size=1, max_size=20
    )
)
def test_any_mark_of_one_line_comes_back(
    tmp_path_factory: pytest.TempPathFactory, mark: str
) -> None:
    read = _read(tmp_path_factory.mktemp("any"), _csv(HEAD, _row(mark=mark)))
    if mark.strip():
        assert [row.mark for row in read.rows] == [mark.strip()]
    else:
        assert [problem.column for problem in read.problems] == ["mark"]


@settings(max_examples=300, deadline=None)
@given(data=st.binary(max_size=200) | st.text(max_size=200).map(str.encode))
def test_no_file_at_all_breaks_the_reader(
    tmp_path_factory: pytest.TempPathFactory, data: bytes
) -> None:
    read = _read(tmp_path_factory.mktemp("any"), data)
    assert read.problems
    assert read.rows == ()


@pytest.mark.parametrize(
    ("header", "parts"),
    [
        ("force", ("force", "")),
        ("force [kN]", ("force", "kN")),
        ("force(kN)", ("force", "kN")),
        ("force, kN", ("force", "kN")),
        ("force, ULS, kN", ("force, ULS", "kN")),
        ("force [", ("force [", "")),
    ],
)
def test_a_header_splits_into_name_and_unit(header: str, parts: tuple[str, str]) -> None:
    assert split_unit(header) == parts


def test_rows_are_plain_frozen_data(tmp_path: Path) -> None:
    [row] = _read(tmp_path, _csv(HEAD, GOOD)).rows
    assert isinstance(row, MemberRow)
    with pytest.raises(AttributeError):
        row.mark = "RB9"  # type: ignore[misc]
    assert hash(row) == hash(pickle.loads(pickle.dumps(row)))


def test_the_librarys_catalogues_decide_what_is_known(tmp_path: Path) -> None:
    text = _csv(
        (*HEAD, "standard"), (*GOOD, "NZS 3404"), (*_row(mark="RB2", section="150x90x11 UA"), "")
    )
    (tmp_path / "members.csv").write_text(text)
    read = read_schedule(tmp_path / "members.csv", ends=ENDS, strict=False)
    assert [row.mark for row in read.rows] == ["RB1"]
    [problem] = read.problems
    assert (problem.row, problem.column) == (3, "section")
    assert "150x90x11 UA" in problem.reason
    assert "Did you mean" in problem.reason


def test_a_very_long_name_is_told_shortly(tmp_path: Path) -> None:
    [problem] = _read(tmp_path, _csv(HEAD, _row(section="x" * 50_000))).problems
    assert len(str(problem)) < 1100


def test_the_size_limit_is_the_stated_one() -> None:
    assert reading.LARGEST_FILE == LARGEST_FILE == 20_000_000
