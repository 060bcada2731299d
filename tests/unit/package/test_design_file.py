"""A design file is read whole or every problem is listed by line, and is changed without harm."""

from __future__ import annotations

import difflib
import inspect
import json
import os
import pickle
import re
import subprocess
import sys
import tomllib
from collections.abc import Callable
from dataclasses import FrozenInstanceError, fields
from pathlib import Path
from typing import Any

import pytest
import tomlkit
from hypothesis import given, settings
from hypothesis import strategies as st

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.joints.ends import Bolted, Gusset, Welded
from tensionlib.joints.gusset_shape import GussetShape
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.holes import Hole, Pattern
from tensionlib.joints.welded_runs import FilletRun
from tensionlib.members.beside import Across, Overstrength
from tensionlib.package.files import (
    LARGEST_FILE,
    DesignFile,
    DesignFileError,
    FileWriteError,
    KnownNames,
    MemberRow,
    Problem,
    atomic,
    end_tables,
    project_record,
    read_design_file,
    schema,
    update_design_file,
)
from tensionlib.package.files.locate import Lines, dotted
from tensionlib.package.files.records import written
from tensionlib.package.files.shaped import KINDS
from tensionlib.quantities import (
    ANGLE,
    FORCE,
    LENGTH,
    STRESS,
    WEIGHT_PER_LENGTH,
    Quantity,
    parse,
)
from tensionlib.units import kN, mm

DOCS = Path(__file__).parents[3] / "docs"


def _only(*names: str) -> Callable[[str], None]:
    def look_up(name: str) -> None:
        if name not in names:
            raise DataNotFoundError(f"{name!r} is not known.{did_you_mean(name, names)}")

    return look_up


KNOWN = KnownNames(
    section=_only("150x90x10 UA", "100x100x8 EA"),
    steel=_only("AS/NZS 3679.1 300", "AS/NZS 3678 250"),
    bolts=_only("M20 8.8/S", "M24 8.8/S"),
    metal=_only("E48XX"),
    standard=_only("NZS 3404"),
    options=("ductility",),
)

PLATE = 'plate = { thickness = "12 mm", steel = "AS/NZS 3678 250" }'
DESIGN = f"""\
# Walkway canopy: the bracing of bays 1 to 4.
[project]
job_number = "J-104"
title = "Walkway canopy bracing"  # as on the drawings
client = "Harbour <Walk> & Trust"
made_by = "AB"
status = "draft"
revision = "B"
date = 2025-03-14
notes = ["Gussets by others.", '''Two
lines.''']

[[project.revisions]]
revision = "A"
date = "2025-02-01"
description = "For review"

[[project.revisions]]
revision = "B"
date = "2025-03-14"
description = "For construction"
made_by = "AB"
checked_by = "CD"

[standard]
name = "NZS 3404"

[ends.A]
kind = "bolted"
to = "long leg"
bolts = "M20 8.8/S"
threads = "in shear plane"
per_line = 3
pitch = "70 mm"       # common detail
gauge = "75 mm"
end_distance = "35 mm"
{PLATE}

[ends."welded 6"]
kind = "welded"
to = "long leg"
leg_size = "6 mm"
length_1 = "150 mm"

[ends."welded 6".plate]
thickness = "10 mm"
steel = "AS/NZS 3678 250"
width = "260 mm"

[[members]]
mark = "RB1"
title = "roof brace, grid B"
section = "150x90x10 UA"
steel = "AS/NZS 3679.1 300"
length = "4.6 m"
force = "285 kN"
end = "A"

[[members]]
mark = "RB2"
section = "100x100x8 EA"
steel = "AS/NZS 3679.1 300"
length = "5.1 m"
force = "140 kN"
start_end = "A"
far_end = "welded 6"
"""
SCHEDULE = """
[schedule]
file = "members.csv"
ignore = ["checked?"]

[schedule.columns]
force = "N star"

[schedule.defaults]
steel = "AS/NZS 3679.1 300"
end = "A"
"""
ROWS = """\
mark,section,"length, m",N star [kN],note,checked?
RB3,150x90x10 UA,4.6,285,"brace, grid C",y
RB4,100x100x8 EA,5.1,0,,
"""


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    (tmp_path / "canopy.toml").write_bytes(DESIGN.encode())
    (tmp_path / "members.csv").write_bytes(ROWS.encode())
    return tmp_path


def _read(folder: Path, text: str | bytes = DESIGN, **kwargs: Any) -> DesignFile:
    path = folder / "canopy.toml"
    path.write_bytes(text if isinstance(text, bytes) else text.encode())
    return read_design_file(path, known=KNOWN, **kwargs)


def _problems(folder: Path, text: str | bytes, **kwargs: Any) -> list[str]:
    with pytest.raises(DesignFileError) as caught:
        _read(folder, text, **kwargs)
    return [str(problem) for problem in caught.value.problems]


def _line(text: str, fragment: str) -> int:
    """The line of the text in which a fragment first stands."""
    return text[: text.index(fragment)].count("\n") + 1


# Reading


def test_members_ends_and_project_are_read(folder: Path) -> None:
    design = _read(folder)
    assert design.path == folder / "canopy.toml"
    assert design.standard.name == "NZS 3404"
    assert list(design.ends) == ["A", "welded 6"]
    first, second = design.members
    assert (first.mark, first.title, first.section) == ("RB1", "roof brace, grid B", "150x90x10 UA")
    assert (first.length.internal, first.force.internal) == (4600.0, 285_000.0)
    assert first.end_1 == first.end_2 == design.ends["A"]
    assert (second.end_1.name, second.end_2.name) == ("A", "welded 6")
    assert first.origin == f"canopy.toml line {_line(DESIGN, '[[members]]')}"
    assert design.project.client == "Harbour <Walk> & Trust"
    assert design.project.notes == ("Gussets by others.", "Two\nlines.")
    assert (design.schedule, design.problems) == (None, ())


def test_an_end_gives_the_arguments_of_its_connection(folder: Path) -> None:
    ends = _read(folder).ends
    bolted = ends["A"].arguments()
    assert Bolted(**{**bolted, "plate": Gusset(**bolted["plate"])}) == Bolted(
        to="long leg",
        bolts="M20 8.8/S",
        threads="in shear plane",
        per_line=3,
        pitch=70 * mm,
        gauge=75 * mm,
        end_distance=35 * mm,
        plate=Gusset(12 * mm, "AS/NZS 3678 250"),
    )
    assert ends["A"].end() == Bolted(**{**bolted, "plate": Gusset(**bolted["plate"])})
    assert ends["welded 6"].end() == Welded(
        to="long leg",
        leg_size=6 * mm,
        length_1=150 * mm,
        plate=Gusset(10 * mm, "AS/NZS 3678 250", 260 * mm),
    )
    assert "quality" not in ends["welded 6"].arguments()


def test_the_fields_of_an_end_are_those_of_its_connection() -> None:
    for table, connection in (
        *((end_tables.BY_KIND[kind], made) for kind, made in KINDS.items()),
        (end_tables.GussetTable, Gusset),
        (end_tables.HangerTable, Hanger),
        (end_tables.ShapeTable, GussetShape),
        (end_tables.HoleTable, Hole),
        (end_tables.RunTable, FilletRun),
        (end_tables.AcrossTable, Across),
        (end_tables.OverstrengthTable, Overstrength),
    ):
        # The kind of an end tells its table, and the number of cover plates tells them from a
        # gusset.
        extra = {"kind"} if table in end_tables.BY_KIND.values() else set()
        extra |= {"number"} if table is end_tables.GussetTable else set()
        names = {field.name for field in fields(connection)}
        assert set(table.model_fields) - extra == names, table
        required = {name for name, field in table.model_fields.items() if field.is_required()}
        due = {f.name for f in fields(connection) if "MISSING" in repr(f.default)}
        assert required - extra == due, table


def test_the_defaults_of_a_table_are_those_of_its_connection() -> None:
    for table, connection in (
        *((end_tables.BY_KIND[kind], made) for kind, made in KINDS.items()),
        (end_tables.GussetTable, Gusset),
        (end_tables.HangerTable, Hanger),
        (end_tables.HoleTable, Hole),
        (end_tables.AcrossTable, Across),
        (end_tables.OverstrengthTable, Overstrength),
    ):
        for field in fields(connection):
            mine = table.model_fields[field.name]
            if not mine.is_required() and mine.default is not None:
                assert mine.default == field.default, (table, field.name)


def test_lines_of_holes_take_the_arguments_of_the_pattern() -> None:
    there = inspect.signature(Pattern.lines).parameters
    assert set(end_tables.LinesTable.model_fields) == set(there)
    due = {name for name, one in there.items() if one.default is inspect.Parameter.empty}
    assert due == {
        name for name, one in end_tables.LinesTable.model_fields.items() if one.is_required()
    }


def test_an_end_may_stand_inside_its_member(folder: Path) -> None:
    inside = f'{{ kind = "welded", to = "leg", leg_size = "6 mm", length_1 = "90 mm", {PLATE} }}'
    design = _read(folder, DESIGN.replace('end = "A"', f"end = {inside}"))
    assert design.members[0].end_1.name == ""
    assert dict(design.members[0].end_1.stated)["length_1"] == 90 * mm


def test_schedule_rows_follow_the_members_of_the_file(folder: Path) -> None:
    design = _read(folder, DESIGN + SCHEDULE)
    assert [(m.mark, m.origin) for m in design.members[2:]] == [
        ("RB3", "members.csv row 2"),
        ("RB4", "members.csv row 3"),
    ]
    assert design.members[2].title == "brace, grid C"
    assert design.schedule is not None
    assert design.schedule.file == "members.csv"
    assert dict(design.schedule.columns) == {"force": "N star"}
    assert dict(design.schedule.defaults) == {"steel": "AS/NZS 3679.1 300", "end": "A"}


def test_good_rows_are_members_when_asked_for(folder: Path) -> None:
    (folder / "members.csv").write_text(ROWS.replace(",0,", ",-5,"))
    design = _read(folder, DESIGN + SCHEDULE, strict=False)
    assert [member.mark for member in design.members] == ["RB1", "RB2", "RB3"]
    [problem] = design.problems
    assert (problem.file, problem.row, problem.column) == ("members.csv", 3, "N star [kN]")
    assert "compression enters only as the reversal case of a gusset" in problem.reason


def test_a_length_by_default_of_the_schedule(folder: Path) -> None:
    (folder / "members.csv").write_text("mark,section,force [kN]\nRB3,150x90x10 UA,1\n")
    text = SCHEDULE.replace('force = "N star"', "").replace(
        'end = "A"', 'end = "A"\nlength = "5 m"'
    )
    assert _read(folder, DESIGN + text).members[2].length == 5000 * mm


@pytest.mark.parametrize("change", [lambda t: t.replace("\n", "\r\n"), lambda t: "\ufeff" + t])
def test_line_ends_and_a_byte_order_mark_do_not_matter(
    folder: Path, change: Callable[[str], str]
) -> None:
    plain, other = _read(folder), _read(folder, change(DESIGN))
    assert other.members == plain.members


def test_options_go_to_the_standard_as_they_are(folder: Path) -> None:
    text = DESIGN.replace('name = "NZS 3404"', 'name = "NZS 3404"\noptions.ductility = 3')
    assert dict(_read(folder, text).standard.options) == {"ductility": 3}


def test_the_project_record_is_the_agreed_one(folder: Path) -> None:
    record = project_record(_read(folder))
    assert record == {
        "format": "tensionlib",
        "version": 1,
        "kind": "project",
        "job_number": "J-104",
        "title": "Walkway canopy bracing",
        "client": "Harbour <Walk> & Trust",
        "site": "",
        "made_by": "AB",
        "checked_by": "",
        "approved_by": "",
        "status": "draft",
        "revision": "B",
        "date": "2025-03-14",
        "revisions": [
            {
                "revision": "A",
                "date": "2025-02-01",
                "description": "For review",
                "made_by": "",
                "checked_by": "",
            },
            {
                "revision": "B",
                "date": "2025-03-14",
                "description": "For construction",
                "made_by": "AB",
                "checked_by": "CD",
            },
        ],
        "standard": "NZS 3404",
        "paper": "A4",
        "design_file": "canopy.toml",
        "notes": ["Gussets by others.", "Two\nlines."],
    }
    assert json.loads(json.dumps(record)) == record


def test_what_is_read_is_frozen(folder: Path) -> None:
    design = _read(folder)
    with pytest.raises(FrozenInstanceError):
        design.project.title = "other"  # type: ignore[misc]
    with pytest.raises(TypeError):
        design.ends["B"] = design.ends["A"]  # type: ignore[index]
    assert isinstance(design.members[0], MemberRow)


_TEXT = st.text(st.characters(exclude_categories=["Cs", "Cc"], include_characters="\n\r\t"))


@settings(max_examples=100, deadline=None)
@given(note=_TEXT, title=st.text(st.characters(exclude_categories=["Cs", "Cc", "Zl", "Zp"])))
def test_any_text_is_kept_to_the_letter(
    tmp_path_factory: pytest.TempPathFactory, note: str, title: str
) -> None:
    raw = tomlkit.parse(DESIGN)
    raw["project"]["notes"] = [note]  # type: ignore[index]
    raw["members"][0]["title"] = title  # type: ignore[index]
    design = _read(tmp_path_factory.mktemp("any"), tomlkit.dumps(raw))
    assert (design.project.notes, design.members[0].title) == ((note,), title)


# Problems: what is replaced, by what, and the problems there are then. A line is named by a
# fragment of the changed text that first stands on it.

_NO_NAME = "is blank; text is due"
_MEANT = "Did you mean 'bolted' or 'bolted pattern'?"
_KIND = 'write kind = "bolted", "bolted pattern", "pinned", "rod", "welded" or "welded runs"'
_ENDS_OR_TWO = "write end for both ends alike, or start_end and far_end"
BAD: list[tuple[str, str, list[tuple[str, str]]]] = [
    # project
    (
        "client =",
        "cleint =",
        [("cleint", "project.cleint: unknown key. Did you mean 'client'?")],
    ),
    (
        "client =",
        "zzz =",
        [
            (
                "zzz",
                "project.zzz: unknown key. Keys here are job_number, title, client, site, made_by,"
                " checked_by, approved_by, status, revision, date, paper, notes, revisions.",
            )
        ],
    ),
    (
        'job_number = "J-104"\n',
        "",
        [("[project]", 'project.job_number: missing; write job_number = "J-104"')],
    ),
    (
        'job_number = "J-104"',
        "job_number = 104",
        [("job_number", "project.job_number: got 104; text in quotation marks is due")],
    ),
    (
        'job_number = "J-104"',
        'job_number = "  "',
        [("job_number", f"project.job_number: {_NO_NAME}")],
    ),
    (
        'status = "draft"',
        'status = "isued"',
        [
            (
                "status",
                "project.status: got 'isued'; one of 'draft', 'issued' is due."
                " Did you mean 'issued'?",
            )
        ],
    ),
    (
        'status = "draft"\nrevision = "B"\ndate = 2025-03-14',
        'status = "issued"\ndate = ""',
        [
            (
                "[project]",
                'project.revision: blank, and an issued file states it; write revision = "A", or'
                ' status = "draft"',
            ),
            (
                'date = ""',
                "project.date: blank, and an issued file states it; write date ="
                ' "2025-03-14", or status = "draft"',
            ),
        ],
    ),
    (
        'status = "draft"\nrevision = "B"',
        'status = "issued"\nrevision = "D"',
        [
            (
                'revision = "D"',
                "project.revision: got 'D', which has no row in the revision table (A, B); add a"
                " [[project.revisions]] for it",
            )
        ],
    ),
    (
        "date = 2025-03-14",
        "date = 2025-03-14T10:00:00",
        [("date", "project.date: got 2025-03-14 10:00:00; text in quotation marks is due")],
    ),
    (
        "date = 2025-03-14",
        'paper = "A3"',
        [("paper", "project.paper: got 'A3'; one of 'A4', 'Letter' is due.")],
    ),
    (
        '"Gussets by others."',
        "1",
        [("notes", "project.notes[1]: got 1; text in quotation marks is due")],
    ),
    (
        "lines.'''",
        "lines.''', 5",
        [("lines.''', 5", "project.notes[3]: got 5; text in quotation marks is due")],
    ),
    (
        'revision = "A"\n',
        "",
        [("[[project.rev", 'project.revisions[1].revision: missing; write revision = "A"')],
    ),
    (
        'title = "Walk',
        'title = "\\u0007Walk',
        [
            (
                "\\u0007",
                "project.title: holds the control character U+0007, which cannot be printed;"
                " take it out",
            )
        ],
    ),
    (
        'title = "Walkway canopy bracing"',
        'title = "a\\nb"',
        [("a\\nb", "project.title: got 'a\\nb'; one line of text without tabs is due")],
    ),
    # whole tables
    (
        "[standard]\n",
        "[standrad]\n",
        [
            ("#", "standard: missing; write a table [standard] with name"),
            ("[standrad]", "standrad: unknown key. Did you mean 'standard'?"),
        ],
    ),
    (
        '[standard]\nname = "NZS 3404"',
        'standard = "NZS 3404"\n',
        [
            (
                'standard = "NZS 3404"',
                "project.revisions[2].standard: unknown key. Keys here are revision, date,"
                " description, made_by, checked_by.",
            ),
            ("#", "standard: missing; write a table [standard] with name"),
        ],
    ),
    (
        "# Walkway",
        'ends = "A"\n# Walkway',
        [("[ends.A]", "is not valid TOML at column 8: Cannot overwrite a value; found ']'")],
    ),
    # standard
    (
        'name = "NZS 3404"',
        'name = "NZS 3405"',
        [("NZS 3405", "standard.name: 'NZS 3405' is not known. Did you mean 'NZS 3404'?")],
    ),
    (
        'name = "NZS 3404"',
        'name = "NZS 3404"\noptions = { ductilty = 3 }',
        [
            (
                "options",
                "standard.options.ductilty: unknown option. Did you mean 'ductility'?",
            )
        ],
    ),
    (
        'name = "NZS 3404"',
        'name = "NZS 3404"\noptions.ductility = [3]',
        [
            (
                "options",
                "standard.options.ductility: got a list; text, a finite number, true or false is"
                " due",
            )
        ],
    ),
    # ends
    ('kind = "bolted"\n', "", [("[ends.A]", f"ends.A.kind: missing; {_KIND}")]),
    (
        'kind = "bolted"',
        'kind = "boltd"',
        [("boltd", f"ends.A.kind: got 'boltd'; {_KIND}. {_MEANT}")],
    ),
    ('kind = "bolted"', "kind = 4", [("kind", f"ends.A.kind: got 4; {_KIND}")]),
    (
        "[ends.A]\n",
        '[ends]\nB = "bolted"\n[ends.A]\n',
        [("B =", "ends.B: got 'bolted'; a table [ends.B] is due")],
    ),
    (
        '[ends."welded 6"]\n',
        '[ends."a\\nb"]\nkind = "welded"\n' + PLATE + '\n[ends."welded 6"]\n',
        [
            (
                '"a\\nb"',
                "ends.\"a\\nb\": the name of an end: got 'a\\nb'; one line of text without tabs is"
                " due",
            ),
            ('"a\\nb"', 'ends."a\\nb".to: missing; write to = "long leg"'),
            ('"a\\nb"', 'ends."a\\nb".leg_size: missing; write leg_size = "6 mm"'),
            ('"a\\nb"', 'ends."a\\nb".length_1: missing; write length_1 = "120 mm"'),
        ],
    ),
    (
        'pitch = "70 mm"',
        "pitch = 70",
        [
            (
                "pitch",
                "ends.A.pitch: got 70, a bare number; give a length with its unit, for example"
                " '70 mm'",
            )
        ],
    ),
    (
        'pitch = "70 mm"',
        'pitch = "70 kN"',
        [
            (
                "pitch",
                "ends.A.pitch: got '70 kN', a force; a length is due, for example '70 mm'",
            )
        ],
    ),
    (
        'pitch = "70 mm"',
        'pitch = "-70 mm"',
        [("pitch", "ends.A.pitch: got -70 mm; it must be above 0 mm")],
    ),
    (
        'pitch = "70 mm"',
        'pitch = "70 mm"\nclearance = "-1 mm"',
        [("clearance", "ends.A.clearance: got -1 mm; it must be at least 0 mm")],
    ),
    (
        'pitch = "70 mm"',
        'pich = "70 mm"',
        [("pich", "ends.A.pich: unknown key. Did you mean 'pitch'?")],
    ),
    (
        'pitch = "70 mm"       # common detail\n',
        "",
        [
            (
                "[ends.A]",
                "ends.A.pitch: missing; two or more bolts a line need it, for example '70 mm'",
            )
        ],
    ),
    (
        'gauge = "75 mm"\n',
        "",
        [
            (
                "[ends.A]",
                "ends.A.gauge: missing; an angle's bolts need the distance from its heel, for"
                " example '55 mm'",
            )
        ],
    ),
    (
        "per_line = 3",
        "per_line = 3.5",
        [("per_line", "ends.A.per_line: got 3.5; a whole number is due, for example 3")],
    ),
    (
        "per_line = 3",
        "per_line = 0",
        [("per_line", "ends.A.per_line: got 0; it must be at least 1")],
    ),
    (
        "per_line = 3",
        'per_line = "3"',
        [("per_line", "ends.A.per_line: got '3'; a whole number is due, for example 3")],
    ),
    (
        "per_line = 3",
        "per_line = 3\nlines = 3",
        [("lines = 3", "ends.A.lines: got 3; it must be at most 2")],
    ),
    (
        'threads = "in shear plane"',
        'threads = "in plane"',
        [
            (
                "threads",
                "ends.A.threads: got 'in plane'; one of 'in shear plane', 'out of shear plane' is"
                " due. Did you mean 'in shear plane'?",
            )
        ],
    ),
    (
        'bolts = "M20 8.8/S"',
        'bolts = "M20 8.9/S"',
        [
            (
                "8.9/S",
                "ends.A.bolts: 'M20 8.9/S' is not known. Did you mean 'M20 8.8/S' or 'M24 8.8/S'?",
            )
        ],
    ),
    (
        PLATE,
        'plate = { thickness = "12 mm", depth = "9 mm" }',
        [
            ("plate", 'ends.A.plate.steel: missing; write steel = "AS/NZS 3678 250"'),
            ("plate", "ends.A.plate.depth: unknown key. Did you mean 'width'?"),
        ],
    ),
    (PLATE, 'plate = "12 mm"', [("plate", "ends.A.plate: got '12 mm'; a table is due")]),
    (PLATE + "\n", "", [("[ends.A]", f"ends.A.plate: missing; write {PLATE}")]),
    (
        'steel = "AS/NZS 3678 250"\nwidth',
        'steel = "AS/NZS 3678 251"\nwidth',
        [
            (
                "251",
                "ends.\"welded 6\".plate.steel: 'AS/NZS 3678 251' is not known. Did you mean"
                " 'AS/NZS 3678 250' or 'AS/NZS 3679.1 300'?",
            )
        ],
    ),
    (
        'leg_size = "6 mm"',
        'leg_size = "6 mm"\nk_te = 1.2',
        [("k_te", 'ends."welded 6".k_te: got 1.2; it must be at most 1')],
    ),
    (
        'leg_size = "6 mm"',
        'leg_size = "6 mm"\nmetal = "E48XY"',
        [("metal", "ends.\"welded 6\".metal: 'E48XY' is not known. Did you mean 'E48XX'?")],
    ),
    # members
    (
        'force = "285 kN"',
        "force = 285",
        [
            (
                "force = 285",
                "members[1].force: got 285, a bare number; give a force with its unit, for example"
                " '285 kN'",
            )
        ],
    ),
    (
        'force = "285 kN"',
        'force = "-285 kN"',
        [
            (
                "-285 kN",
                "members[1].force: got -285 kN, a compression force; this tool designs tension, and"
                " compression enters only as the reversal case of a gusset. Give the tension force,"
                " for example '285 kN'",
            )
        ],
    ),
    (
        'length = "4.6 m"',
        'length = "0 m"',
        [('"0 m"', "members[1].length: got 0 mm; it must be above 0 mm")],
    ),
    (
        'section = "150x90x10 UA"',
        'section = "150x90x11 UA"',
        [
            (
                "150x90x11 UA",
                "members[1].section: '150x90x11 UA' is not known. Did you mean '150x90x10 UA'?",
            )
        ],
    ),
    (
        'mark = "RB2"',
        'mark = "RB1 "',
        [('"RB1 "', "members[2].mark: 'RB1' is the mark of the member at line 50 too")],
    ),
    ('mark = "RB2"', 'mark = ""', [('mark = ""', f"members[2].mark: {_NO_NAME}")]),
    (
        'end = "A"',
        'end = "AA"',
        [
            (
                '"AA"',
                "members[1].end: no end is named 'AA'; ends are 'A', 'welded 6'. Did you mean 'A'?",
            )
        ],
    ),
    ('end = "A"\n', "", [("[[members]]", f"members[1].end: missing; {_ENDS_OR_TWO}")]),
    (
        'end = "A"',
        'end = "A"\nfar_end = "A"',
        [('end = "A"\nfar', f"members[1].end: got end and far_end; {_ENDS_OR_TWO}")],
    ),
    (
        'end = "A"',
        "end = 5",
        [("end = 5", "members[1].end: got 5; the name of an end or a table is due")],
    ),
    (
        'end = "A"',
        'end = { kind = "bolted", to = "leg" }',
        [
            ("end = {", 'members[1].end.bolts: missing; write bolts = "M20 8.8/S"'),
            ("end = {", 'members[1].end.threads: missing; write threads = "in shear plane"'),
            ("end = {", "members[1].end.per_line: missing; write per_line = 3"),
            ("end = {", f"members[1].end.plate: missing; write {PLATE}"),
            ("end = {", 'members[1].end.end_distance: missing; write end_distance = "35 mm"'),
        ],
    ),
    (
        'end = "A"',
        'end = "A"\nstandard = "NZS 3405"',
        [("NZS 3405", "members[1].standard: 'NZS 3405' is not known. Did you mean 'NZS 3404'?")],
    ),
    (
        'title = "roof',
        'titel = "roof',
        [("titel", "members[1].titel: unknown key. Did you mean 'title' or 'ties' or 'steel'?")],
    ),
    # no TOML
    (
        'client = "Harbour <Walk> & Trust"',
        'client "Harbour"',
        [
            (
                "client",
                "is not valid TOML at column 8: Expected '=' after a key in a key/value pair; found"
                " '\"Harbour\"'",
            )
        ],
    ),
    (
        "client =",
        "title =",
        [
            (
                'title = "Harbour',
                "is not valid TOML at column 33: Cannot overwrite a value; found the end of"
                " 'title = \"Harbour <Walk> & Trust\"'",
            )
        ],
    ),
    (
        "[ends.A]",
        "[ends.A",
        [
            (
                "[ends.A",
                "is not valid TOML at column 8: Expected ']' at the end of a table declaration;"
                " found the end of '[ends.A'",
            )
        ],
    ),
    (
        '[ends."welded 6"]',
        "[ends.A]",
        [
            (
                '[ends.A]\nkind = "welded"',
                "is not valid TOML at column 8: Cannot declare ('ends', 'A') twice; found ']'",
            )
        ],
    ),
]


@pytest.mark.parametrize(
    ("old", "new", "problems"), BAD, ids=[f"{i}: {case[1][:40]!r}" for i, case in enumerate(BAD)]
)
def test_a_problem_is_told_with_its_line_and_key(
    folder: Path, old: str, new: str, problems: list[tuple[str, str]]
) -> None:
    assert old in DESIGN
    text = DESIGN.replace(old, new, 1)
    told = _problems(folder, text)
    assert sorted(told) == sorted(
        f"canopy.toml, line {_line(text, fragment)}"
        + (": " if message.startswith("is not") else ", ")
        + message
        for fragment, message in problems
    )


def test_there_are_enough_bad_cases() -> None:
    assert len(BAD) >= 40


def test_a_number_in_words_is_told_by_the_door(folder: Path) -> None:
    for value in ("70", "seventy", "4,5 mm", "70 m3", "nan mm", ""):
        [problem] = _problems(folder, DESIGN.replace('"70 mm"', f'"{value}"', 1))
        assert problem.startswith(f"canopy.toml, line {_line(DESIGN, 'pitch')}, ends.A.pitch: got ")


def test_all_problems_are_listed_in_the_order_of_the_file(folder: Path) -> None:
    text = DESIGN + SCHEDULE
    for old, new in (
        ('force = "285 kN"', "force = 285"),
        ("client", "cleint"),
        ("70 mm", "70 m2"),
        ('section = "100x100x8 EA"', 'section = "100x100x9 EA"'),
        ('far_end = "welded 6"', 'far_end = "welded 8"'),
        ('"M20 8.8/S"', '"M20"'),
        ('mark = "RB2"', 'mark = "RB1"\nbad = 1'),
    ):
        text = text.replace(old, new, 1)
    (folder / "members.csv").write_text(ROWS.replace("RB4,100x100x8 EA", "RB1,nothing"))
    with pytest.raises(DesignFileError) as caught:
        _read(folder, text)
    told = [(p.file, p.field) for p in caught.value.problems]
    assert told == [
        ("canopy.toml", "project.cleint"),
        ("canopy.toml", "ends.A.bolts"),
        ("canopy.toml", "ends.A.pitch"),
        ("canopy.toml", "members[1].force"),
        ("canopy.toml", "members[2].mark"),
        ("canopy.toml", "members[2].bad"),
        ("canopy.toml", "members[2].section"),
        ("canopy.toml", "members[2].far_end"),
        ("members.csv", "mark"),
        ("members.csv", "section"),
    ]
    lines = [problem.line for problem in caught.value.problems if problem.file == "canopy.toml"]
    assert lines == sorted(line for line in lines if line is not None)
    assert str(caught.value).splitlines()[0] == "10 problems:"
    assert len(str(caught.value).splitlines()) == 11
    again = pickle.loads(pickle.dumps(caught.value))
    assert (str(again), again.problems) == (str(caught.value), caught.value.problems)
    assert isinstance(caught.value, InputError)


@pytest.mark.parametrize(
    ("table", "message"),
    [
        ("project = 3", "project: got 3; a table is due"),
        ("standard = []", "standard: got a list; a table is due"),
        (
            "standard = { name = 'NZS 3404', options = 3 }",
            "standard.options: got 3; a table is due",
        ),
        ("ends = [1]", "ends: got a list; write each end as a table [ends.NAME]"),
        ("members = [1]", "members[1]: got 1; a table is due"),
        ("members = {}", "members: got a table; write each member under [[members]]"),
        ("members = 3", "members: got 3; write each member under [[members]]"),
        ("schedule = 'members.csv'", "schedule: got 'members.csv'; a table is due"),
    ],
)
def test_a_table_that_is_none_is_told(folder: Path, table: str, message: str) -> None:
    whole = {
        "project": 'project = { job_number = "1", title = "x" }',
        "standard": 'standard.name = "NZS 3404"',
    }
    whole[table.split()[0]] = table
    told = _problems(folder, "\n".join(whole.values()))
    assert told == [f"canopy.toml, line {[*whole].index(table.split()[0]) + 1}, {message}"]


def test_a_member_of_a_bad_end_is_not_blamed(folder: Path) -> None:
    told = _problems(folder, (DESIGN + SCHEDULE).replace("70 mm", "70", 1))
    assert len(told) == 1


def test_a_mark_stands_once_in_file_and_schedule(folder: Path) -> None:
    (folder / "members.csv").write_text(ROWS.replace("RB3", "RB2"))
    line = DESIGN.count("\n", 0, DESIGN.rindex("[[members]]")) + 1
    assert _problems(folder, DESIGN + SCHEDULE) == [
        f"members.csv, row 2, mark: 'RB2' is the mark of the member at canopy.toml line {line} too"
    ]


SCHEDULE_BAD = [
    (
        'file = "members.csv"',
        'file = "member.csv"',
        ["member.csv: there is no such file. Did you mean 'members.csv'?"],
    ),
    (
        'force = "N star"',
        'froce = "N star"',
        ["canopy.toml, line 73, schedule.columns.froce: unknown key. Did you mean 'force'?"],
    ),
    (
        'end = "A"',
        'end = "C"',
        [
            "canopy.toml, line 77, schedule.defaults.end: no end is named 'C'; ends are 'A',"
            " 'welded 6'."
        ],
    ),
    (
        'steel = "AS/NZS 3679.1 300"',
        'steel = "AS/NZS 3679.1 301"',
        [
            "canopy.toml, line 76, schedule.defaults.steel: 'AS/NZS 3679.1 301' is not known. Did"
            " you mean 'AS/NZS 3679.1 300' or 'AS/NZS 3678 250'?"
        ],
    ),
    (
        'end = "A"',
        'end = "A"\nlength = "5"',
        None,
    ),
    (
        'end = "A"',
        'end = "A"\nforce = "5 kN"',
        [
            "canopy.toml, line 78, schedule.defaults.force: unknown key. Keys here are title,"
            " section, steel, length, end, end_1, end_2, standard."
        ],
    ),
    (
        'ignore = ["checked?"]',
        'ignore = "checked?"',
        ["canopy.toml, line 70, schedule.ignore: got 'checked?'; a list is due"],
    ),
]


@pytest.mark.parametrize(("old", "new", "messages"), SCHEDULE_BAD)
def test_a_problem_of_the_schedules_settings(
    folder: Path, old: str, new: str, messages: list[str] | None
) -> None:
    text = DESIGN + SCHEDULE.replace(old, new, 1)
    told = _problems(folder, text)
    if messages is None:
        [one] = told
        assert one.startswith("canopy.toml, line 78, schedule.defaults.length: got '5', a number")
    else:
        assert told == messages


OUTSIDE = [
    "../members.csv",
    "a/../../members.csv",
    "/etc/hostname.csv",
    "C:/members.csv",
    "a\\..\\members.csv",
    "\\\\server\\share\\members.csv",
]


@pytest.mark.parametrize("file", OUTSIDE)
def test_a_schedule_outside_the_folder_is_refused(folder: Path, file: str) -> None:
    (folder / "in").mkdir()
    text = DESIGN + SCHEDULE.replace('"members.csv"', f"'{file}'")
    assert _problems(folder / "in", text) == [
        f"canopy.toml, line 69, schedule.file: got {file!r}; a file in the folder of canopy.toml or"
        ' below it is due, written with "/", for example "members.csv"'
    ]


def test_a_schedule_below_the_folder_or_behind_a_link_is_read(folder: Path) -> None:
    (folder / "in").mkdir()
    (folder / "in" / "tables").mkdir()
    (folder / "in" / "tables" / "rows.csv").symlink_to(folder / "members.csv")
    text = DESIGN + SCHEDULE.replace('"members.csv"', '"./tables/../tables/rows.csv"')
    design = _read(folder / "in", text)
    assert design.members[2].origin == "./tables/../tables/rows.csv row 2"


BAD_BYTES = [
    (b"\xff\xfe[\x00", "canopy.toml: is in UTF-16; save it as UTF-8"),
    (
        b'[project]\ntitle = "caf\xe9"\n',
        "canopy.toml, line 2: byte 0xE9 is not UTF-8 text; save the file as UTF-8",
    ),
    (
        b"x = 1\n\n\0",
        "canopy.toml, line 3: holds a NUL character, so it is no plain text or UTF-16 without its"
        " mark; save it as UTF-8",
    ),
    (b"x = " + b"[" * 100_000, "canopy.toml: is nested too deeply to be read"),
    (
        b"a = 1\nb = [1,\n",
        "canopy.toml, line 2: is not valid TOML at its end: Invalid value",
    ),
]


@pytest.mark.parametrize(("data", "message"), BAD_BYTES, ids=[case[1][:40] for case in BAD_BYTES])
def test_bytes_that_are_no_design_file(folder: Path, data: bytes, message: str) -> None:
    assert _problems(folder, data) == [message]


def test_a_number_without_end_is_refused(folder: Path) -> None:
    [problem] = _problems(folder, "x = " + "1" * 5000)
    assert problem.startswith("canopy.toml: is not valid TOML: ")


def test_a_huge_file_is_refused_unread(folder: Path) -> None:
    with (folder / "canopy.toml").open("wb") as stream:
        stream.truncate(LARGEST_FILE + 1)
    with pytest.raises(DesignFileError, match="holds 20000001 bytes; at most 20000000 are read"):
        read_design_file(folder / "canopy.toml", known=KNOWN)


def test_a_missing_file_is_told_with_the_nearest_name(folder: Path) -> None:
    with pytest.raises(DesignFileError) as caught:
        read_design_file(folder / "canpy.toml", known=KNOWN)
    assert str(caught.value) == "canpy.toml: there is no such file. Did you mean 'canopy.toml'?"


@pytest.mark.skipif(not hasattr(os, "mkfifo"), reason="the system has no named pipes")
def test_what_is_no_ordinary_file_is_refused(folder: Path) -> None:
    os.mkfifo(folder / "pipe.toml")
    with pytest.raises(DesignFileError, match=r"^pipe\.toml: is not an ordinary file$"):
        read_design_file(folder / "pipe.toml", known=KNOWN)


@settings(max_examples=150, deadline=None)
@given(st.data())
def test_no_text_breaks_the_reader(tmp_path_factory: pytest.TempPathFactory, data: Any) -> None:
    """A design file with a piece cut out or doubled is read, or refused with problems."""
    start = data.draw(st.integers(0, len(DESIGN)))
    end = data.draw(st.integers(start, min(len(DESIGN), start + 80)))
    piece = data.draw(st.sampled_from(["", DESIGN[start:end] * 2, "[[", '"', "= 3\n", "\n[a]\n"]))
    text = DESIGN[:start] + piece + DESIGN[end:]
    problems: list[Problem] | None = None
    try:
        _read(tmp_path_factory.mktemp("any"), text)
    except DesignFileError as error:
        problems = error.problems
    assert problems != []
    for problem in problems or ():
        assert problem.line is None or 1 <= problem.line <= text.count("\n") + 1


# Lines

TOML = '''\
top = 1 # a comment with [brackets] and "quotes"
"quoted key" = """
[not.a.table]
""""
dotted . 'lit.eral' . c = 1979-05-27 07:32:00
[a]
list = [
  1, # one ]
  { x = 1, "y#" = [ 'a]', "b\\"]" ] },

  [ "two", [] ],
]
[[b.c]]
d = '\'\'x\'\'\'
[[b.c]]
[b.c.e]
f = {}
[[b.c.g]]
[[b.c.g]]
h.i = true
"\\u00e9\\t" = 1
'''.replace("'\\'\\'", "'''").replace("\\'\\'\\'", "'''")


@pytest.mark.parametrize(
    ("path", "line"),
    [
        (("top",), 1),
        (("quoted key",), 2),
        (("dotted", "lit.eral", "c"), 5),
        (("a",), 6),
        (("a", "list"), 7),
        (("a", "list", 0), 8),
        (("a", "list", 1, "x"), 9),
        (("a", "list", 1, "y#", 1), 9),
        (("a", "list", 2), 11),
        (("a", "list", 2, 1), 11),
        (("b", "c", 0), 13),
        (("b", "c", 0, "d"), 14),
        (("b", "c", 1), 15),
        (("b", "c", 1, "e", "f"), 17),
        (("b", "c", 1, "g", 1, "h", "i"), 20),
        (("b", "c", 1, "g", 1, "\u00e9\t"), 21),
        (("b", "c", 1, "missing", "key"), 15),
        (("nothing",), 1),
    ],
)
def test_the_line_of_a_key(path: tuple[str | int, ...], line: int) -> None:
    assert Lines(TOML).line(path) == line


def _paths(value: Any, path: tuple[str | int, ...] = ()) -> Any:
    yield path
    if isinstance(value, dict):
        for key, one in value.items():
            yield from _paths(one, (*path, key))
    elif isinstance(value, list):
        for place, one in enumerate(value):
            yield from _paths(one, (*path, place))


def test_every_path_of_the_sample_is_found() -> None:
    lines = Lines(TOML)
    assert all(lines.has(path) for path in _paths(tomllib.loads(TOML)))


_KEYS = st.text(st.characters(exclude_categories=["Cs"]), min_size=1, max_size=6)
_VALUES = st.recursive(
    st.integers(-9, 9)
    | st.booleans()
    | st.floats(allow_nan=False)
    | st.text(st.characters(exclude_categories=["Cs"]), max_size=12)
    | st.dates()
    | st.datetimes(),
    lambda inner: st.lists(inner, max_size=3) | st.dictionaries(_KEYS, inner, max_size=3),
    max_leaves=8,
)


@settings(max_examples=300, deadline=None)
@given(st.dictionaries(_KEYS, _VALUES, max_size=4))
def test_every_path_of_any_document_is_found(document: dict[str, Any]) -> None:
    text = tomlkit.dumps(document)
    data = tomllib.loads(text)
    lines = Lines(text)
    for path in _paths(data):
        assert lines.has(path)


@pytest.mark.parametrize(
    ("path", "text"),
    [
        (("ends", "A", "pitch"), "ends.A.pitch"),
        (("members", 1, "force"), "members[2].force"),
        (("ends", "welded 6", "plate"), 'ends."welded 6".plate'),
        (("ends", 'a"\n'), 'ends."a\\"\\n"'),
    ],
)
def test_a_path_is_written_for_a_reader(path: tuple[str | int, ...], text: str) -> None:
    assert dotted(path) == text


# Changing


def _change(folder: Path, changes: dict[str, Any]) -> bool:
    return update_design_file(folder / "canopy.toml", changes, known=KNOWN)


def _changed_lines(folder: Path, before: str = DESIGN) -> list[str]:
    after = (folder / "canopy.toml").read_bytes().decode()
    diff = difflib.ndiff(before.splitlines(keepends=True), after.splitlines(keepends=True))
    return [line for line in diff if line[0] in "+-"]


def test_one_value_changes_and_every_other_byte_stays(folder: Path) -> None:
    assert _change(folder, {"ends": {"A": {"pitch": "80 mm"}}})
    assert _changed_lines(folder) == [
        '- pitch = "70 mm"       # common detail\n',
        '+ pitch = "80 mm"       # common detail\n',
    ]
    assert read_design_file(folder / "canopy.toml", known=KNOWN).ends["A"].end().pitch == 80 * mm  # type: ignore[union-attr]


@pytest.mark.parametrize("mark", ["", "\ufeff"])
@pytest.mark.parametrize("end", ["\n", "\r\n"])
def test_line_ends_and_byte_order_mark_stay(folder: Path, end: str, mark: str) -> None:
    before = mark + DESIGN.replace("\n", end)
    (folder / "canopy.toml").write_bytes(before.encode())
    assert _change(folder, {"project": {"status": "draft", "site": "Quay 3", "client": "New"}})
    after = (folder / "canopy.toml").read_bytes().decode()
    lines = before.replace('client = "Harbour <Walk> & Trust"', 'client = "New"').split(end)
    expected = [line + end for line in lines]
    place = next(i for i, line in enumerate(expected) if line.startswith("lines.'''"))
    expected.insert(place + 1, f'site = "Quay 3"{end}')
    assert after + end == "".join(expected)


def test_nothing_is_written_when_nothing_changes(
    folder: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(atomic.os, "replace", lambda *a: pytest.fail("the file was replaced"))
    changes: dict[str, Any] = {
        "project": {
            "status": "draft",
            "site": None,
            "notes": ["Gussets by others.", "Two\nlines."],
        },
        "ends": {"A": {"per_line": 3, "pitch": "70 mm"}},
        "members": {"RB1": {"end": "A"}},
    }
    assert not _change(folder, changes)
    assert (folder / "canopy.toml").read_bytes() == DESIGN.encode()


def test_a_literal_that_is_equal_is_not_written_otherwise(folder: Path) -> None:
    text = DESIGN.replace('"Walkway canopy bracing"', "'Walkway canopy bracing'")
    (folder / "canopy.toml").write_text(text)
    _change(folder, {"project": {"title": "Walkway canopy bracing", "revision": "C"}})
    assert _changed_lines(folder, text) == ['- revision = "B"\n', '+ revision = "C"\n']


def test_one_and_true_are_different_values(folder: Path) -> None:
    for value, text in ((1, "1"), (True, "true"), (1.0, "1.0")):
        assert _change(folder, {"standard": {"options": {"ductility": value}}})
        assert f"ductility = {text}\n" in (folder / "canopy.toml").read_text()
        assert not _change(folder, {"standard": {"options": {"ductility": value}}})


def test_a_text_that_does_not_read_as_wanted_is_not_written(
    folder: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(tomlkit, "dumps", lambda document: DESIGN.replace("J-104", "J-105"))
    with pytest.raises(InputError) as caught:
        _change(folder, {"project": {"site": "Quay 3"}})
    assert str(caught.value) == (
        "changes: cannot be brought into canopy.toml as it is laid out; write the table that"
        " changes under a header of its own"
    )
    assert (folder / "canopy.toml").read_bytes() == DESIGN.encode()


def test_a_length_is_written_in_the_unit_it_is_shown_in() -> None:
    assert written(parse("4.05041929134 ft").to("ft")) == "4.05041929134 ft"
    assert written(parse("1234.5678 mm")) == "1234.5678 mm"
    assert written("A") == "A"


def test_quantities_are_written_with_their_unit(folder: Path) -> None:
    _change(folder, {"members": {"RB1": {"force": 310.5 * kN}}, "ends": {"A": {"gauge": 45 * mm}}})
    assert [line for line in _changed_lines(folder) if line[0] == "+"] == [
        '+ gauge = "45 mm"\n',
        '+ force = "310.5 kN"\n',
    ]


@settings(max_examples=300)
@given(
    st.floats(1e-9, 1e12),
    st.sampled_from(["mm", "m", "in", "ft"]),
)
def test_a_written_length_reads_as_the_same_number(size: float, unit: str) -> None:
    quantity = Quantity(size, LENGTH).to(unit)
    assert parse(str(written(quantity))).internal == quantity.internal
    for quantity in (
        Quantity(size, FORCE).to("kip"),
        Quantity(size, STRESS).to("ksi"),
        Quantity(size, WEIGHT_PER_LENGTH).to("lbf/ft"),
        Quantity(size, ANGLE).to("deg"),
    ):
        assert parse(str(written(quantity))).internal == quantity.internal


def test_members_are_changed_added_and_taken_out_by_mark(folder: Path) -> None:
    added = {
        "section": "100x100x8 EA",
        "steel": "AS/NZS 3679.1 300",
        "length": "3 m",
        "force": 90 * kN,
        "end": "A",
    }
    _change(folder, {"members": {"RB1": {"title": None}, "RB2": None, "RB9": added}})
    design = read_design_file(folder / "canopy.toml", known=KNOWN)
    assert [(m.mark, m.title, m.force.internal) for m in design.members] == [
        ("RB1", "", 285_000.0),
        ("RB9", "", 90_000.0),
    ]
    assert "# common detail" in (folder / "canopy.toml").read_text()


def test_a_first_member_and_a_first_end_can_be_added(folder: Path) -> None:
    bare = DESIGN[: DESIGN.index("[ends.A]")]
    (folder / "canopy.toml").write_text(bare)
    end = _read(folder).ends["A"]
    (folder / "canopy.toml").write_text(bare)
    member = {"section": "100x100x8 EA", "steel": "AS/NZS 3679.1 300", "length": "3 m"}
    _change(
        folder, {"ends": {"A": end}, "members": {"RB1": {**member, "force": "1 kN", "end": "A"}}}
    )
    text = (folder / "canopy.toml").read_text()
    assert text.startswith(bare)
    design = read_design_file(folder / "canopy.toml", known=KNOWN)
    assert (design.ends["A"], len(design.members)) == (end, 1)


def test_a_whole_end_takes_the_place_of_another(folder: Path) -> None:
    design = _read(folder)
    _change(folder, {"ends": {"welded 6": design.ends["A"], "B": design.ends["welded 6"]}})
    ends = read_design_file(folder / "canopy.toml", known=KNOWN).ends
    assert ends["welded 6"].arguments() == design.ends["A"].arguments()
    assert ends["B"].arguments() == design.ends["welded 6"].arguments()


def test_a_revision_is_added_and_the_old_ones_stay(folder: Path) -> None:
    rows = [
        {"revision": "A", "date": "2025-02-01", "description": "For review"},
        {
            "revision": "B",
            "date": "2025-03-14",
            "description": "For construction",
            "made_by": "AB",
            "checked_by": "CD",
        },
        {"revision": "C", "date": "2025-04-02", "description": "Braces lengthened"},
    ]
    _change(folder, {"project": {"revision": "C", "revisions": rows}})
    assert _changed_lines(folder) == [
        '- revision = "B"\n',
        '+ revision = "C"\n',
        "+ \n",
        "+ [[project.revisions]]\n",
        '+ revision = "C"\n',
        '+ date = "2025-04-02"\n',
        '+ description = "Braces lengthened"\n',
    ]


REFUSED = [
    (
        {"ends": {"A": {"pitch": 80}}},
        "canopy.toml, line 34, ends.A.pitch: got 80, a bare number; give a length with its unit,"
        " for example '70 mm'",
    ),
    (
        {"project": {"cleint": "x"}},
        "canopy.toml, line 12, project.cleint: unknown key. Did you mean 'client'?",
    ),
    (
        {"ends": {"welded 6": None}},
        "canopy.toml, line 55, members[2].far_end: no end is named 'welded 6'; ends are 'A'.",
    ),
    (
        {"members": {"RB1": {"force": "-1 kN"}}},
        "canopy.toml, line 56, members[1].force: got -1 kN, a compression force; this tool designs"
        " tension, and compression enters only as the reversal case of a gusset. Give the tension"
        " force, for example '285 kN'",
    ),
    (
        {"project": {"title": None}},
        'canopy.toml, line 2, project.title: missing; write title = "Walkway canopy bracing"',
    ),
]


@pytest.mark.parametrize(("changes", "problem"), REFUSED, ids=[str(case[0]) for case in REFUSED])
def test_an_invalid_file_is_never_written(
    folder: Path, changes: dict[str, Any], problem: str
) -> None:
    with pytest.raises(DesignFileError) as caught:
        _change(folder, changes)
    assert str(caught.value) == (
        "canopy.toml was not changed; after the change it would not be valid:\n  " + problem
    )
    assert str(pickle.loads(pickle.dumps(caught.value))) == str(caught.value)
    assert (folder / "canopy.toml").read_bytes() == DESIGN.encode()
    assert sorted(os.listdir(folder)) == ["canopy.toml", "members.csv"]


def test_an_invalid_file_can_be_mended(folder: Path) -> None:
    (folder / "canopy.toml").write_text(DESIGN.replace('"70 mm"', "70"))
    assert _change(folder, {"ends": {"A": {"pitch": "70 mm"}}})
    assert (folder / "canopy.toml").read_bytes() == DESIGN.encode()


def test_a_broken_file_is_not_touched(folder: Path) -> None:
    broken = DESIGN.replace("[standard]", "[standard")
    (folder / "canopy.toml").write_text(broken)
    with pytest.raises(DesignFileError) as caught:
        _change(folder, {"project": {"status": "issued"}})
    assert str(caught.value).startswith(
        "canopy.toml was not changed; it is not valid TOML as it stands:\n"
        "  canopy.toml, line 25: is not valid TOML at column 10: "
    )
    assert (folder / "canopy.toml").read_text() == broken


def test_a_change_that_breaks_the_schedule_is_refused(folder: Path) -> None:
    text = DESIGN + SCHEDULE.replace('end = "A"', "").replace("steel", 'end_1 = "A"\nsteel')
    (folder / "canopy.toml").write_text(text)
    (folder / "members.csv").write_text(
        'mark,section,"length, m",N star [kN],end\nRB3,150x90x10 UA,4.6,285,welded 6\n'
    )
    text = text.replace('end_1 = "A"\n', "").replace('far_end = "welded 6"', 'far_end = "A"')
    (folder / "canopy.toml").write_text(text)
    with pytest.raises(DesignFileError) as caught:
        _change(folder, {"ends": {"welded 6": None}})
    assert [str(problem) for problem in caught.value.problems] == [
        "members.csv, row 2, end: no end is named 'welded 6'; ends are 'A'."
    ]
    assert (folder / "canopy.toml").read_text() == text


def test_a_schedule_that_is_bad_already_does_not_stand_in_the_way(folder: Path) -> None:
    (folder / "canopy.toml").write_text(DESIGN + SCHEDULE)
    (folder / "members.csv").write_text(ROWS.replace(",285,", ",-285,"))
    assert _change(folder, {"project": {"site": "Quay 3"}})


@pytest.mark.parametrize("step", ["fsync", "replace"])
def test_a_write_that_fails_leaves_the_old_file(
    folder: Path, monkeypatch: pytest.MonkeyPatch, step: str
) -> None:
    def fail(*args: object) -> None:
        raise OSError(5, "Input/output error")

    monkeypatch.setattr(atomic.os, step, fail)
    with pytest.raises(FileWriteError, match="what stood there is unchanged"):
        _change(folder, {"project": {"site": "Quay 3"}})
    assert (folder / "canopy.toml").read_bytes() == DESIGN.encode()
    assert sorted(os.listdir(folder)) == ["canopy.toml", "members.csv"]


@pytest.mark.parametrize(
    ("changes", "message"),
    [
        ({"project": {1: "x"}}, "changes['project']: the key 1 is not text"),
        (
            {"project": {"site": object}},
            "changes['project']['site']: got <class 'object'>; text, a number, a quantity, a list"
            " or a mapping is due",
        ),
    ],
)
def test_changes_that_no_file_can_hold_are_refused(
    folder: Path, changes: dict[str, Any], message: str
) -> None:
    with pytest.raises(InputError) as caught:
        _change(folder, changes)
    assert str(caught.value) == message


LAYOUTS = [
    DESIGN,
    DESIGN.replace("[ends.A]", "[ends]\n[ends.A]"),
    DESIGN.replace('[standard]\nname = "NZS 3404"\n', "").replace(
        "# Walkway", 'standard.name = "NZS 3404"\n# Walkway'
    ),
    DESIGN.replace('[standard]\nname = "NZS 3404"\n', "")
    + '\n[standard]\nname = "NZS 3404"\n[ends.Z]\nkind = "welded"\nto = "leg"\nleg_size = "6 mm"\n'
    + f'length_1 = "90 mm"\n{PLATE}\n',
]


@pytest.mark.parametrize("text", LAYOUTS, ids=["plain", "header", "dotted", "out of order"])
@pytest.mark.parametrize(
    "changes",
    [
        {"ends": {"A": {"pitch": "80 mm", "edge_kind": "rolled"}}},
        {"ends": {"A": {"plate": {"width": "300 mm"}}}},
        {"ends": {"welded 6": {"plate": {"width": None}}}},
        {"standard": {"options": {"ductility": 3}}},
        {"project": {"notes": ["one", "two", "three"], "revisions": []}},
        {"members": {"RB2": {"start_end": None, "far_end": None, "end": "A"}}},
        {"project": {"title": 'a "quoted" \\ title # with marks', "notes": ["a\nb\r\n\t'''"]}},
    ],
    ids=lambda value: str(value)[:40],
)
def test_every_layout_takes_every_change(folder: Path, text: str, changes: dict[str, Any]) -> None:
    (folder / "canopy.toml").write_text(text)
    before = tomllib.loads(text)
    assert _change(folder, changes)
    after = (folder / "canopy.toml").read_bytes().decode()
    assert tomllib.loads(after) == _expected(before, changes)
    comments = re.compile("# .*(?=\n)")
    assert comments.findall(text)[:3] == comments.findall(after)[:3] or "title" in str(changes)


def _expected(data: dict[str, Any], changes: dict[str, Any]) -> dict[str, Any]:
    for key, value in changes.items():
        if key == "members":
            for mark, change in value.items():
                _expected(next(one for one in data[key] if one["mark"] == mark), change)
        elif value is None:
            del data[key]
        elif isinstance(value, dict):
            _expected(data.setdefault(key, {}), value)
        else:
            data[key] = value
    return data


# The documented layout


def test_the_schema_in_the_documents_is_the_codes() -> None:
    text = (DOCS / "design-file.schema.json").read_text(encoding="utf-8")
    assert text == schema.schema_text()


def test_the_schema_takes_good_files_and_refuses_bad_ones(folder: Path) -> None:
    jsonschema = pytest.importorskip("jsonschema")
    check = jsonschema.Draft202012Validator(schema.design_file_schema())
    data = tomllib.loads((DESIGN + SCHEDULE).replace("2025-03-14\nnotes", '"2025-03-14"\nnotes'))
    assert list(check.iter_errors(data)) == []
    for old, new in (
        ("client", "cleint"),
        ('"70 mm"', "70"),
        ('kind = "bolted"', 'kind = "boltd"'),
        ('file = "members.csv"', ""),
        ("per_line = 3", "per_line = 0"),
    ):
        text = (DESIGN + SCHEDULE).replace("2025-03-14\nnotes", '"2025-03-14"\nnotes')
        assert old in text
        assert list(check.iter_errors(tomllib.loads(text.replace(old, new, 1))))


def test_the_example_in_the_documents_reads(folder: Path) -> None:
    text = (DOCS / "design-file.md").read_text(encoding="utf-8")
    [example] = re.findall(r"```toml\n# canopy\.toml\n(.*?)```", text, re.DOTALL)
    [rows] = re.findall(r"```\n(mark,.*?)```", text, re.DOTALL)
    (folder / "members.csv").write_text(rows)
    (folder / "canopy.toml").write_text(example)
    design = read_design_file(folder / "canopy.toml")  # with the library's own catalogues
    assert [member.mark for member in design.members] == ["RB1", "RB2", "RB3"]


def test_the_documents_name_every_key() -> None:
    text = (DOCS / "design-file.md").read_text(encoding="utf-8")
    tables = [
        schema.ProjectTable,
        schema.RevisionTable,
        schema.StandardTable,
        *end_tables.BY_KIND.values(),
        end_tables.GussetTable,
        end_tables.HangerTable,
        end_tables.ShapeTable,
        end_tables.HoleTable,
        end_tables.LinesTable,
        end_tables.RunTable,
        end_tables.AcrossTable,
        end_tables.OverstrengthTable,
        schema.MemberTable,
        schema.ScheduleTable,
        schema.DesignFileTables,
    ]
    for table in tables:
        for key in table.model_fields:
            assert re.search(rf"`{key}`|\[\[?{key}", text), f"{key} is not in docs/design-file.md"


def test_importing_the_package_of_files_is_light() -> None:
    code = (
        "import sys, tensionlib.package.files\n"
        "heavy = {'pydantic', 'pandas', 'openpyxl', 'tomlkit', 'sympy', 'handcalcs'}\n"
        "print(sorted(heavy & set(sys.modules)))"
    )
    ended = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert ended.stdout.strip() == "[]"
