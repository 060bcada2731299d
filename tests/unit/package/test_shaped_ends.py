"""Ends of every kind, gussets with more to them, and what a member carries, in a design file."""

from __future__ import annotations

import json
import re
import tomllib
from copy import deepcopy
from pathlib import Path
from typing import Any

import pytest
import tomlkit

from tensionlib.joints.ends import Bolted, Gusset
from tensionlib.joints.gusset_shape import GussetShape
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.holes import Hole, Pattern
from tensionlib.joints.pattern_end import BoltedPattern, Covers
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.welded_runs import FilletRun, WeldedRuns
from tensionlib.members.beside import Across, Overstrength
from tensionlib.package.files import (
    DesignFile,
    DesignFileError,
    Problem,
    end_tables,
    read_design_file,
    schema,
    update_design_file,
)
from tensionlib.package.project import check_file
from tensionlib.quantities import parse

DOCS = Path(__file__).parents[3] / "docs"
Data = dict[str, Any]

# Every key of every table, each with a value that is not its default.

CORNERS = [["0 mm", "0 mm"], ["420 mm", "0 mm"], ["420 mm", "240 mm"], ["0 mm", "240 mm"]]
SHAPE: Data = {
    "corners": CORNERS,
    "supported": [3],
    "member_at": ["140 mm", "120 mm"],
    "angle": "5 deg",
}
HANGER: Data = {
    "bolts": "M20 8.8/TB",
    "number": 4,
    "gauge": "110 mm",
    "tributary": "80 mm",
    "thickness": "25 mm",
    "steel": "AS/NZS 3678 300",
    "threads": "out of shear plane",
    "angle": "10 deg",
    "prying": 0.25,
}
GUSSET: Data = {
    "thickness": "12 mm",
    "steel": "AS/NZS 3678 250",
    "width": "230 mm",
    "hanger": HANGER,
    "shape": SHAPE,
    "compression": "60 kN",
    "free_length": "150 mm",
    "length_factor": 1.1,
    "support_leg": "6 mm",
    "support_quality": "GP",
}
LUG: Data = {"thickness": "16 mm", "steel": "AS/NZS 3678 250", "width": "160 mm"}
LINES: Data = {
    "per_line": 3,
    "at": ["50 mm", "105 mm"],
    "end_distance": "40 mm",
    "pitch": "70 mm",
    "stagger": ["0 mm", "35 mm"],
    "element": "long leg",
    "first": 5,
}
SLOT: Data = {
    "mark": "A",
    "x": "75 mm",
    "y": "55 mm",
    "element": "short leg",
    "bolt": False,
    "kind": "short slot",
    "slot": "across",
}
REAMED: Data = {"mark": "B", "x": "145 mm", "y": "55 mm", "element": "short leg"} | {
    "diameter": "23 mm"
}
PATTERN: Data = {
    "kind": "bolted pattern",
    "to": "long leg",
    "bolts": "M20 8.8/TF",
    "threads": "in shear plane",
    "holes": [LINES, SLOT, REAMED],
    "plate": GUSSET,
    "plate_end_distance": "45 mm",
    "plate_edge_distance": "50 mm",
    "edge_kind": "machine cut",
    "packing": "8 mm",
    "slip_factor": 0.3,
    "share": "elastic",
    "credit_behind": False,
    "block_tension": "non-uniform",
    "k_te": 0.85,
    "k_te_reason": "tested",
}
COVERS: Data = LUG | {"number": 1}
RUN: Data = {
    "mark": "heel",
    "x_1": "0 mm",
    "y_1": "10 mm",
    "x_2": "180 mm",
    "y_2": "20 mm",
    "leg_size": "8 mm",
}
RUNS: Data = {
    "kind": "welded runs",
    "to": "long leg",
    "runs": [RUN],
    "plate": {"thickness": "12 mm", "steel": "AS/NZS 3678 250", "width": "260 mm"},
    "quality": "GP",
    "metal": "E48XX",
    "k_te": 0.85,
    "k_te_reason": "tested",
}
PINNED: Data = {
    "kind": "pinned",
    "pin": "40 mm",
    "pin_f_y": "350 MPa",
    "hole": "41 mm",
    "edge_beyond": "75 mm",
    "plate": LUG,
    "plate_edge_beyond": "70 mm",
    "eye_width": "150 mm",
    "gap": "3 mm",
    "rotates": True,
    "to": "plate",
    "k_te": 0.9,
    "k_te_reason": "tested",
}
ROD: Data = {
    "kind": "rod",
    "thread": "M24",
    "fork_capacity": "130 kN",
    "certified_by": "certificate 12 of the fork's maker",
    "pin": "24 mm",
    "hole": "26 mm",
    "plate": LUG,
    "plate_edge_beyond": "50 mm",
    "coupling": "sleeve",
    "sleeve_diameter": "50 mm",
    "sleeve_steel": "AS/NZS 3679.1 300",
    "engagement": "40 mm",
    "bracing": False,
    "to": "rod",
    "k_te": 0.9,
    "k_te_reason": "tested",
}
ACROSS: Data = {
    "span": "3.5 m",
    "self_weight": False,
    "weight_factor": 1.35,
    "load": "0.2 kN/m",
    "side_load": "0.1 kN/m",
    "offset_x": "5 mm",
    "offset_y": "4 mm",
    "sag_limit": "20 mm",
    "stretch_limit": "8 mm",
}
OVERSTRENGTH: Data = {"category": "3", "factor": 1.4, "bearing_factor": 1.1}
MEMBER: Data = {
    "mark": "RB1",
    "section": "150x100x12 UA",
    "steel": "AS/NZS 3679.1 300",
    "length": "4 m",
    "force": "150 kN",
    "service_force": "100 kN",
    "across": ACROSS,
    "overstrength": OVERSTRENGTH,
    "end": "points",
}
PAIR: Data = {
    "mark": "RB2",
    "section": "2/150x100x12 UA, long legs, gap 12 mm",
    "steel": "AS/NZS 3679.1 300",
    "length": "4 m",
    "force": "150 kN",
    "ties": "900 mm",
    "end": "runs",
}
FILE: Data = json.loads(  # so that no table stands in two places
    json.dumps(
        {
            "project": {"job_number": "J-1", "title": "Test"},
            "standard": {"name": "AS 4100"},
            "ends": {
                "points": PATTERN,
                "covers": PATTERN | {"plate": COVERS},
                "runs": RUNS,
                "pinned": PINNED,
                "rod": ROD,
            },
            "members": [MEMBER, PAIR],
        }
    )
)
TABLES: dict[str, tuple[type[Any], tuple[str | int, ...]]] = {
    "pattern": (end_tables.PatternTable, ("ends", "points")),
    "lines": (end_tables.LinesTable, ("ends", "points", "holes", 0)),
    "hole": (end_tables.HoleTable, ("ends", "points", "holes", 1)),
    "reamed hole": (end_tables.HoleTable, ("ends", "points", "holes", 2)),
    "gusset": (end_tables.GussetTable, ("ends", "points", "plate")),
    "covers": (end_tables.GussetTable, ("ends", "covers", "plate")),
    "hanger": (end_tables.HangerTable, ("ends", "points", "plate", "hanger")),
    "shape": (end_tables.ShapeTable, ("ends", "points", "plate", "shape")),
    "welded runs": (end_tables.RunsTable, ("ends", "runs")),
    "run": (end_tables.RunTable, ("ends", "runs", "runs", 0)),
    "pinned": (end_tables.PinnedTable, ("ends", "pinned")),
    "rod": (end_tables.RodTable, ("ends", "rod")),
    "across": (end_tables.AcrossTable, ("members", 0, "across")),
    "overstrength": (end_tables.OverstrengthTable, ("members", 0, "overstrength")),
    "member": (schema.MemberTable, ("members", 0)),
    "pair": (schema.MemberTable, ("members", 1)),
}


def _read(folder: Path, data: Data | str = FILE) -> DesignFile:
    path = folder / "job.toml"
    path.write_text(data if isinstance(data, str) else tomlkit.dumps(data), encoding="utf-8")
    return read_design_file(path)


def _end(folder: Path, name: str) -> Any:
    return _read(folder).ends[name].end()


def _problems(folder: Path, data: Data | str) -> list[Problem]:
    try:
        _read(folder, data)
    except DesignFileError as error:
        return error.problems
    return []


def _told(folder: Path, data: Data | str) -> list[Problem]:
    problems = _problems(folder, data)
    assert problems, "nothing was refused"
    return problems


def _at(data: Any, path: tuple[str | int, ...]) -> Any:
    for step in path:
        data = data[step]
    return data


def _dotted(*path: str | int) -> str:
    return "".join(f"[{s + 1}]" if isinstance(s, int) else f".{s}" for s in path).lstrip(".")


# What is read


def test_every_key_is_in_the_file_of_these_tests() -> None:
    for model in {model for model, _ in TABLES.values()} - {schema.MemberTable}:
        there = {key for made, path in TABLES.values() if made is model for key in _at(FILE, path)}
        assert there == set(model.model_fields), model


def test_a_pattern_of_lines_and_holes(tmp_path: Path) -> None:
    gusset = Gusset(
        "12 mm",
        "AS/NZS 3678 250",
        "230 mm",
        hanger=Hanger(
            "M20 8.8/TB",
            4,
            "110 mm",
            "80 mm",
            "25 mm",
            "AS/NZS 3678 300",
            threads="out of shear plane",
            angle="10 deg",
            prying=0.25,
        ),
        shape=GussetShape(CORNERS, [3], ("140 mm", "120 mm"), "5 deg"),
        compression="60 kN",
        free_length="150 mm",
        length_factor=1.1,
        support_leg="6 mm",
        support_quality="GP",
    )
    holes = Pattern.lines(
        3,
        ["50 mm", "105 mm"],
        "40 mm",
        "70 mm",
        ["0 mm", "35 mm"],
        element="long leg",
        first=5,
    )
    holes = holes.with_hole(
        Hole("A", "75 mm", "55 mm", "short leg", False, "short slot", "across")
    ).with_hole(Hole("B", "145 mm", "55 mm", "short leg", diameter="23 mm"))
    expected = BoltedPattern(
        to="long leg",
        bolts="M20 8.8/TF",
        threads="in shear plane",
        holes=holes,
        plate=gusset,
        plate_end_distance="45 mm",
        plate_edge_distance="50 mm",
        edge_kind="machine cut",
        packing="8 mm",
        slip_factor=0.3,
        share="elastic",
        credit_behind=False,
        block_tension="non-uniform",
        k_te=0.85,
        k_te_reason="tested",
    )
    found = _end(tmp_path, "points")
    assert found == expected
    assert [hole.mark for hole in found.holes.holes] == ["5", "6", "7", "8", "9", "10", "A", "B"]
    covers = Covers("16 mm", "AS/NZS 3678 250", "160 mm", number=1)
    assert _end(tmp_path, "covers") == expected.but(plate=covers)


def test_welded_runs(tmp_path: Path) -> None:
    assert _end(tmp_path, "runs") == WeldedRuns(
        to="long leg",
        runs=(FilletRun("heel", "0 mm", "10 mm", "180 mm", "20 mm", "8 mm"),),
        plate=Gusset("12 mm", "AS/NZS 3678 250", "260 mm"),
        quality="GP",
        metal="E48XX",
        k_te=0.85,
        k_te_reason="tested",
    )


def test_pins_and_rods(tmp_path: Path) -> None:
    lug = Gusset("16 mm", "AS/NZS 3678 250", "160 mm")
    assert _end(tmp_path, "pinned") == Pinned(
        pin="40 mm",
        pin_f_y="350 MPa",
        hole="41 mm",
        edge_beyond="75 mm",
        plate=lug,
        plate_edge_beyond="70 mm",
        eye_width="150 mm",
        gap="3 mm",
        rotates=True,
        k_te=0.9,
        k_te_reason="tested",
    )
    assert _end(tmp_path, "rod") == Threaded(
        thread="M24",
        fork_capacity="130 kN",
        certified_by="certificate 12 of the fork's maker",
        pin="24 mm",
        hole="26 mm",
        plate=lug,
        plate_edge_beyond="50 mm",
        coupling="sleeve",
        sleeve_diameter="50 mm",
        sleeve_steel="AS/NZS 3679.1 300",
        engagement="40 mm",
        bracing=False,
        k_te=0.9,
        k_te_reason="tested",
    )


def test_what_a_member_carries(tmp_path: Path) -> None:
    first, second = _read(tmp_path).members
    assert first.service_force == parse("100 kN")
    assert (first.ties, second.ties) == (None, parse("900 mm"))
    assert first.across == Across(
        span="3.5 m",
        self_weight=False,
        weight_factor=1.35,
        load="0.2 kN/m",
        side_load="0.1 kN/m",
        offset_x="5 mm",
        offset_y="4 mm",
        sag_limit="20 mm",
        stretch_limit="8 mm",
    )
    assert first.overstrength == Overstrength("3", 1.4, 1.1)
    assert (second.service_force, second.across, second.overstrength) == (None, None, None)


def test_what_is_left_out_takes_the_default_of_the_connection(tmp_path: Path) -> None:
    plate = {"thickness": "12 mm", "steel": "AS/NZS 3678 250"}
    pattern = {key: PATTERN[key] for key in ("kind", "to", "bolts", "threads")} | {
        "holes": [{"per_line": 1, "at": ["55 mm"], "end_distance": "40 mm"}],
        "plate": plate,
    }
    pinned = {key: PINNED[key] for key in PINNED if key not in ("to", "gap", "k_te", "k_te_reason")}
    design = _read(
        tmp_path, {key: FILE[key] for key in ("project", "standard")} | {"ends": {"a": pattern}}
    )
    assert design.ends["a"].end() == BoltedPattern(
        to="long leg",
        bolts="M20 8.8/TF",
        threads="in shear plane",
        holes=Pattern.lines(1, ["55 mm"], "40 mm"),
        plate=Gusset(**plate),
    )
    design = _read(tmp_path, FILE | {"ends": {"a": pinned}, "members": []})
    assert design.ends["a"].end().gap == parse("2 mm")


def test_service_forces_reach_the_design(tmp_path: Path) -> None:
    data = deepcopy(FILE)
    data["members"] = [
        MEMBER | {"end": "plain", "across": {"sag_limit": "20 mm"}},
        {key: MEMBER[key] for key in ("section", "steel", "length", "force")}
        | {"mark": "RB3", "end": "plain"},
    ]
    del data["members"][0]["overstrength"]
    data["ends"] = {
        "plain": {
            "kind": "bolted pattern",
            "to": "long leg",
            "bolts": "M20 8.8/TF",
            "threads": "in shear plane",
            "holes": [{"per_line": 3, "at": ["60 mm"], "end_distance": "40 mm", "pitch": "70 mm"}],
            "plate": {"thickness": "12 mm", "steel": "AS/NZS 3678 250"},
        }
    }
    _read(tmp_path, data)
    first, second = check_file(tmp_path / "job.toml")
    served = {check.name for check in first} - {check.name for check in second}
    assert {"slip in service", "tension with bending", "sag"} <= served
    (slip,) = (check for check in first if check.name == "slip in service")
    data["members"][0]["service_force"] = "50 kN"
    _read(tmp_path, data)
    (half,) = (
        check
        for check in check_file(tmp_path / "job.toml")["RB1"]
        if check.name == "slip in service"
    )
    assert half.utilisation == pytest.approx(slip.utilisation / 2, rel=1e-9)


def test_ties_are_refused_by_a_member_of_one_piece(tmp_path: Path) -> None:
    data = deepcopy(FILE)
    data["members"][1]["section"] = "150x100x12 UA"
    _read(tmp_path, data)
    checked = check_file(tmp_path / "job.toml", strict=False)
    assert any("ties: given for 150x100x12 UA" in reason for _, reason in checked.failures)


def test_an_end_of_any_kind_may_stand_in_its_member(tmp_path: Path) -> None:
    data = deepcopy(FILE)
    data["members"][0]["end"] = PATTERN
    assert _read(tmp_path, data).members[0].end_1.end() == _end(tmp_path, "points")
    data["members"][0]["end"] = PATTERN | {"bolt": "M20 8.8/TF"}
    (problem,) = _told(tmp_path, data)
    assert problem.field == "members[1].end.bolt"
    assert problem.reason == "unknown key. Did you mean 'bolts'?"


@pytest.mark.parametrize("name", ["plate", "hanger", "shape", "holes", "runs", "across"])
def test_an_end_may_be_named_as_a_key_is(tmp_path: Path, name: str) -> None:
    data = FILE | {"ends": {name: RUNS}, "members": []}
    assert isinstance(_read(tmp_path, data).ends[name].end(), WeldedRuns)
    (problem,) = _told(tmp_path, FILE | {"ends": {name: RUNS | {"qualty": 1}}, "members": []})
    assert (problem.field, problem.reason) == (
        f"ends.{name}.qualty",
        "unknown key. Did you mean 'quality'?",
    )


def test_a_schedule_states_forces_in_service(tmp_path: Path) -> None:
    data = FILE | {"members": [], "schedule": {"file": "members.csv"}}
    rows = "RB2,150x100x12 UA,AS/NZS 3679.1 300,4 m,150 kN,{},points\n"
    head = "mark,section,steel,length,force,{},end\n"
    table = tmp_path / "members.csv"
    table.write_text(
        head.format("service force") + rows.format("90 kN") + rows.replace("RB2", "RB3").format(""),
        encoding="utf-8",
    )
    first, second = _read(tmp_path, data).members
    assert first.service_force == parse("90 kN")
    assert second.service_force is None
    for header in ("service_force [kN]", "Service Force (kN)", '"service-force, kN"'):
        table.write_text(head.format(header) + rows.format("0"), encoding="utf-8")
        (row,) = _read(tmp_path, data).members
        assert row.service_force == parse("0 kN")
    for header, cell, reason in (
        ("service_force", "90 mm", "got '90 mm', a length; a force is due, for example '285 kN'"),
        ("service_force [kN]", "-5", "got -5 kN, a compression force"),
        ("service_force [kN]", "9 kip", "got '9 kip' under the header 'service_force [kN]'"),
        ("service_force", "90", "neither the header nor the cell '90' has a unit"),
    ):
        table.write_text(head.format(header) + rows.format(cell), encoding="utf-8")
        (problem,) = _told(tmp_path, data)
        assert problem.column == header
        assert problem.reason.startswith(reason)
    mapped = data | {"schedule": {"file": "members.csv", "columns": {"service_force": "N serv"}}}
    table.write_text(head.format("N serv [kN]") + rows.format("80"), encoding="utf-8")
    assert _read(tmp_path, mapped).members[0].service_force == parse("80 kN")


# What is refused: one key at a time, told at its own place

BAD: list[tuple[str, str, Any, str]] = [
    ("pattern", "to", "leg 1", "got 'leg 1'; one of 'long leg'"),
    ("pattern", "bolts", "M21 8.8/S", "'M21 8.8/S' is not on offer; sizes are M12"),
    ("pattern", "threads", "in the plane", "got 'in the plane'; one of 'in shear plane'"),
    ("pattern", "holes", [], "none; give at least one"),
    ("pattern", "holes", {}, "got a table; a list is due"),
    ("pattern", "plate", "12 mm", "got '12 mm'; a table is due"),
    ("pattern", "plate_end_distance", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("pattern", "plate_edge_distance", 50, "got 50, a bare number; give a length"),
    ("pattern", "edge_kind", "torn", "got 'torn'; one of 'sheared'"),
    ("pattern", "packing", "8 kN", "got '8 kN', a force; a length is due"),
    ("pattern", "slip_factor", 1.5, "got 1.5; it must be at most 1"),
    ("pattern", "share", "even", "got 'even'; one of 'equal', 'elastic' is due."),
    ("pattern", "credit_behind", 1, "got 1; true or false is due"),
    ("pattern", "credit_behind", True, "it counts equal shares; give share='equal'"),
    ("pattern", "block_tension", "half", "got 'half'; one of 'uniform', 'non-uniform' is due."),
    ("pattern", "k_te", "0.85", "got '0.85'; a plain number without a unit is due"),
    ("pattern", "k_te_reason", "", "missing; a stated k_te needs the reason"),
    ("lines", "per_line", 0, "got 0; it must be at least 1"),
    ("lines", "per_line", 10**30, f"got {10**30}; it must be at most 100"),
    ("lines", "at", ["50 mm", "-5 mm"], "got -5 mm; it must be above 0 mm"),
    ("lines", "at", [], "got []; the place of each line"),
    ("lines", "end_distance", "40", "got '40', a number without a unit; give its unit"),
    ("lines", "pitch", "70 m3", "got '70 m3', a volume; a length is due"),
    ("lines", "stagger", ["0 mm"], "got 1 entries; 2, one a line, are due"),
    ("lines", "element", "a\nb", "got 'a\\nb'; one line of text without tabs is due"),
    ("lines", "first", -1, "got -1; it must be at least 0"),
    ("hole", "mark", " ", "is blank; text is due"),
    ("hole", "x", "-3 mm", "got -3 mm; it must be above 0 mm"),
    ("hole", "y", "", "got an empty text; give a number and its unit"),
    ("hole", "element", 3, "got 3; text in quotation marks is due"),
    ("hole", "bolt", "yes", "got 'yes'; true or false is due"),
    ("hole", "kind", "slotted", "got 'slotted'; one of 'standard'"),
    ("hole", "slot", "up", "got 'up'; one of 'along', 'across' is due."),
    ("reamed hole", "diameter", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("gusset", "width", "wide", "got 'wide', which is no number with a unit"),
    ("gusset", "hanger", "M20", "got 'M20'; a table is due"),
    ("gusset", "shape", [], "got a list; a table is due"),
    ("gusset", "compression", "-60 kN", "got -60 kN, a compression force"),
    ("gusset", "free_length", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("gusset", "length_factor", 0, "got 0; it must be above 0"),
    ("gusset", "support_leg", "6 MPa", "got '6 MPa', a stress; a length is due"),
    ("gusset", "support_quality", "best", "got 'best'; one of 'SP', 'GP' is due."),
    ("covers", "number", 3, "got 3; it must be at most 2"),
    ("hanger", "bolts", "M20", "got 'M20'; size, class and category are due"),
    ("hanger", "number", 3, "got 3; an even number of bolts is due"),
    ("hanger", "number", 102, "got 102; it must be at most 100"),
    ("hanger", "gauge", "110 N", "got '110 N', a force; a length is due"),
    ("hanger", "tributary", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("hanger", "thickness", 25, "got 25, a bare number; give a length"),
    ("hanger", "steel", "S999", "'S999' is not a grade on offer"),
    ("hanger", "threads", "none", "got 'none'; one of 'in shear plane'"),
    ("hanger", "angle", "10 mm", "got '10 mm', a length; an angle is due, for example '30 deg'"),
    ("hanger", "angle", "89 deg", "85 degrees from the bolts' axis at most"),
    ("hanger", "prying", -0.5, "got -0.5; it must be at least 0"),
    ("shape", "corners", CORNERS[:2], "got 2; three or more are due"),
    ("shape", "corners", [*CORNERS, ["1 mm"]], "got a list; two lengths are due"),
    ("shape", "supported", [4], "got 4; edges are counted 0 to 3"),
    ("shape", "supported", [True], "got True; a whole number is due"),
    ("shape", "member_at", ["500 mm", "120 mm"], "got (500 mm, 120 mm), on the gusset's edge"),
    ("shape", "angle", 5, "got 5, a bare number; give an angle with its unit"),
    ("welded runs", "to", "both flanges", "got 'both flanges'; one of 'long leg'"),
    ("welded runs", "runs", [], "got (); a tuple of FilletRun(...) is due"),
    ("welded runs", "runs", [RUN, RUN], "the marks heel, heel repeat; give each its own"),
    ("welded runs", "quality", "A", "got 'A'; one of 'SP', 'GP' is due."),
    ("welded runs", "metal", "E99", "'E99' is not on offer; there are E41XX"),
    ("run", "mark", 1, "got 1; text in quotation marks is due"),
    ("run", "x_1", "-1 mm", "got -1 mm; it must be at least 0 mm"),
    ("run", "y_1", "1", "got '1', a number without a unit; give its unit"),
    ("run", "x_2", True, "got True; a length is due"),
    ("run", "y_2", "1 rad", "got '1 rad', an angle; a length is due"),
    ("run", "leg_size", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("pinned", "pin", "42 mm", "got 41 mm; no less than the pin's 42 mm is due"),
    ("pinned", "pin_f_y", "350 kN", "got '350 kN', a force; a stress is due"),
    ("pinned", "hole", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("pinned", "edge_beyond", "20 mm", "got 20 mm; the hole would cut the edge"),
    ("pinned", "plate_edge_beyond", "20 mm", "got 20 mm; the hole would cut the edge"),
    ("pinned", "eye_width", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("pinned", "gap", "-1 mm", "got -1 mm; it must be at least 0 mm"),
    ("pinned", "rotates", "no", "got 'no'; true or false is due"),
    ("pinned", "to", "web", "got 'web'; one of 'plate' is due."),
    ("rod", "thread", "M25", "got 'M25'; one of 'M"),
    ("rod", "fork_capacity", "0 kN", "got 0 kN; it must be above 0 kN"),
    ("rod", "certified_by", "", "is blank; text is due"),
    ("rod", "pin", "27 mm", "got 26 mm; no less than the pin's 27 mm is due"),
    ("rod", "hole", "26", "got '26', a number without a unit; give its unit"),
    ("rod", "plate_edge_beyond", "9 mm", "got 9 mm; the hole would cut the edge"),
    ("rod", "coupling", "nut", "got 'nut'; one of 'none', 'turnbuckle', 'sleeve' is due."),
    ("rod", "sleeve_diameter", "20 mm", "got 20 mm; more than the thread's 24 mm is due"),
    ("rod", "sleeve_steel", "S999", "'S999' is not a grade on offer"),
    ("rod", "sleeve_steel", " ", "is blank; text is due"),
    ("rod", "engagement", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("rod", "bracing", 0, "got 0; true or false is due"),
    ("rod", "to", "bar", "got 'bar'; one of 'rod' is due."),
    ("across", "span", "0 m", "got 0 mm; it must be above 0 mm"),
    ("across", "self_weight", "no", "got 'no'; true or false is due"),
    ("across", "weight_factor", 3, "got 3; it must be at most 2"),
    ("across", "load", "0.2 kN", "got '0.2 kN', a force; a weight per length is due"),
    ("across", "side_load", "-0.1 kN/m", "got -0.1 kN/m; it must be at least 0 kN/m"),
    ("across", "offset_x", "-5 mm", "got -5 mm; it must be at least 0 mm"),
    ("across", "offset_y", 4, "got 4, a bare number; give a length"),
    ("across", "sag_limit", "0 mm", "got 0 mm; it must be above 0 mm"),
    ("across", "stretch_limit", "8 kN", "got '8 kN', a force; a length is due"),
    ("overstrength", "category", 3, "got 3; one of '1', '2', '3', '4' is due."),
    ("overstrength", "factor", 0.9, "got 0.9; it must be at least 1"),
    ("overstrength", "bearing_factor", 0, "got 0; it must be above 0"),
    ("member", "service_force", "-100 kN", "got -100 kN, a compression force"),
    ("member", "across", "0.2 kN/m", "got '0.2 kN/m'; a table is due"),
    ("member", "overstrength", 3, "got 3; a table is due"),
    ("pair", "ties", "0 mm", "got 0 mm; it must be above 0 mm"),
]
# What two fields together do is told at the one that the message is about.
_TOLD_AT = {
    ("pinned", "pin"): "hole",
    ("rod", "pin"): "hole",
    ("lines", "at", "-5 mm"): "at[2]",
    ("shape", "corners", "1 mm"): "corners[5]",
    ("shape", "supported", "True"): "supported[1]",
}


@pytest.mark.parametrize(
    ("table", "key", "value", "reason"), BAD, ids=[f"{c[0]} {c[1]} {c[2]!r:.20}" for c in BAD]
)
def test_a_bad_value_is_told_at_its_place(
    tmp_path: Path, table: str, key: str, value: Any, reason: str
) -> None:
    data = deepcopy(FILE)
    path = TABLES[table][1]
    _at(data, path)[key] = value
    problem, *others = _told(tmp_path, data)
    entry = next((at for told, at in _TOLD_AT.items() if _is(told, table, key, value)), key)
    assert (problem.field, others) == (f"{_dotted(*path)}.{entry}", [])
    assert problem.reason.startswith(reason)


def _is(told: tuple[str, ...], table: str, key: str, value: Any) -> bool:
    return told[:2] == (table, key) and (len(told) == 2 or told[2] in str(value))


def test_every_key_has_a_bad_value() -> None:
    for name, (model, _) in TABLES.items():
        if model is schema.MemberTable:
            continue
        same = [other for other, (made, _) in TABLES.items() if made is model]
        tried = {key for table, key, _, _ in BAD if table in same}
        elsewhere = {"kind"} if name in ("pattern", "welded runs", "pinned", "rod") else set()
        # These are told by the same lines of code for the bolted and welded ends.
        elsewhere |= {"plate", "k_te", "k_te_reason", "steel", "thickness"}
        assert set(model.model_fields) - tried <= elsewhere, name


@pytest.mark.parametrize("table", TABLES)
def test_an_unknown_key_is_told_with_the_known_ones(tmp_path: Path, table: str) -> None:
    model, path = TABLES[table]
    data = deepcopy(FILE)
    _at(data, path)["zzzzzz"] = 1
    (problem,) = _told(tmp_path, data)
    assert problem.field == f"{_dotted(*path)}.zzzzzz"
    assert problem.reason == f"unknown key. Keys here are {', '.join(model.model_fields)}."


@pytest.mark.parametrize("table", [name for name in TABLES if name != "pair"])
def test_a_missing_key_is_told_with_an_example_that_is_taken(tmp_path: Path, table: str) -> None:
    model, path = TABLES[table]
    for key in model.model_fields:
        data = deepcopy(FILE)
        # Lines of holes without their number are read as one hole.
        if not model.model_fields[key].is_required() or key in ("kind", "per_line"):
            continue
        del _at(data, path)[key]
        place = f"{_dotted(*path)}.{key}"
        (problem,) = (one for one in _told(tmp_path, data) if one.field == place)
        begins = f"missing; write {key} = "
        assert problem.reason.startswith(begins)
        _at(data, path)[key] = tomllib.loads(problem.reason.removeprefix("missing; write "))[key]
        # It may not go together with what these tests have beside it, and is told elsewhere then.
        assert place not in [one.field for one in _problems(tmp_path, data)]


def test_problems_of_several_tables_are_told_by_their_lines(tmp_path: Path) -> None:
    text = """\
[project]
job_number = "J-1"
title = "Test"
[standard]
name = "AS 4100"
[ends.points]
kind = "bolted pattern"
to = "long leg"
bolts = "M20 8.8/S"
threads = "in shear plane"
holes = [
    { per_line = 3, at = ["60 mm"], end_distance = "40 mm" },
    { mark = "4", x = "250 mm", y = "60 mm", kind = "long slot", diameter = "22 mm" },
    { mark = "5", x = "320", y = "60 mm" },
    7,
]
[ends.points.plate]
thickness = "12 mm"
steel = "AS/NZS 3678 250"
number = 2
[ends.points.plate.hanger]
bolts = "M20 8.8/TB"
number = 5
gauge = "110 mm"
tributary = "80 mm"
thickness = "25 mm"
steel = "AS/NZS 3678 250"
[ends.w]
kind = "welded runs"
to = "plate"
plate = { thickness = "12 mm", steel = "AS/NZS 3678 250" }
[[ends.w.runs]]
mark = "a"
x_1 = "0 mm"
y_1 = "0 mm"
x_2 = "0 mm"
y_2 = "0 mm"
leg_size = "6 mm"
[ends.p]
kind = "pinned"
pin = "40 mm"
pin_f_y = "350 MPa"
hole = "41 mm"
edge_beyond = "75 mm"
plate_edge_beyond = "75 mm"
plate = { thickness = "12 mm", steel = "AS/NZS 3678 250" }
[[members]]
mark = "RB1"
section = "150x100x12 UA"
steel = "AS/NZS 3679.1 300"
length = "4 m"
force = "150 kN"
end = "points"
across = { load = 2 }
overstrength = { factor = 1.2 }
"""
    assert [str(problem) for problem in _told(tmp_path, text)] == [
        "job.toml, line 12, ends.points.holes[1].pitch: missing; two or more holes a line need it,"
        " as '70 mm'",
        "job.toml, line 13, ends.points.holes[2]: hole 4: diameter: a slot's size is the"
        " standard's; leave it out",
        "job.toml, line 14, ends.points.holes[3].x: got '320', a number without a unit; give its"
        " unit, as in '60 mm'",
        "job.toml, line 15, ends.points.holes[4]: got 7; a table is due",
        "job.toml, line 23, ends.points.plate.hanger.number: got 5; an even number of bolts is due",
        "job.toml, line 32, ends.w.runs[1]: run 'a': it starts and ends at (0, 0) mm; two points"
        " apart are due",
        "job.toml, line 46, ends.p.plate.width: missing; a fork plate needs it, for example"
        " '160 mm'",
        "job.toml, line 54, members[1].across.load: got 2, a bare number; give a weight per length"
        " with its unit, for example '0.4 kN/m'",
        'job.toml, line 55, members[1].overstrength.category: missing; write category = "1"',
    ]


def test_cover_plates_need_their_width(tmp_path: Path) -> None:
    data = deepcopy(FILE)
    del data["ends"]["covers"]["plate"]["width"]
    (problem,) = _told(tmp_path, data)
    assert problem.field == "ends.covers.plate.width"
    assert problem.reason == "missing; a cover plate needs it, for example '150 mm'"


def test_a_regular_end_refuses_cover_plates(tmp_path: Path) -> None:
    data = deepcopy(FILE)
    data["ends"]["runs"]["plate"]["number"] = 2
    (problem,) = _told(tmp_path, data)
    assert problem.field == "ends.runs.plate"
    assert "a Gusset is due" in problem.reason


# What is written


def _same_tables(folder: Path) -> None:
    """Every end of the file, written back as it was read, changes nothing of the data."""
    path = folder / "job.toml"
    before = tomllib.loads(path.read_text(encoding="utf-8"))
    ends = read_design_file(path).ends
    update_design_file(path, {"ends": dict(ends)})
    assert tomllib.loads(path.read_text(encoding="utf-8")) == before


def test_ends_are_written_as_they_were_read(tmp_path: Path) -> None:
    design = _read(tmp_path)
    assert {name: end.table() for name, end in design.ends.items()} == FILE["ends"]
    _same_tables(tmp_path)
    path = tmp_path / "job.toml"
    update_design_file(path, {"ends": {"runs": None, "rod": design.ends["points"]}, "members": []})
    again = read_design_file(path).ends
    assert list(again) == ["points", "covers", "pinned", "rod"]
    assert again["rod"].table() == PATTERN
    assert again["rod"].end() == design.ends["points"].end()


CHANGES: list[Data] = [
    {"ends": {"points": {"holes": [LINES | {"pitch": "75 mm"}, SLOT, REAMED]}}},
    {"ends": {"points": {"holes": [LINES, SLOT, REAMED, SLOT | {"mark": "C", "x": "250 mm"}]}}},
    {"ends": {"points": {"holes": [LINES]}}},
    {"ends": {"points": {"plate": {"hanger": {"number": 6, "prying": None}}}}},
    {"ends": {"points": {"plate": {"hanger": None}}}},
    {"ends": {"points": {"plate": {"shape": {"corners": [*CORNERS[:3], ["10 mm", "250 mm"]]}}}}},
    {"ends": {"points": {"plate": {"shape": None, "support_leg": None, "length_factor": 1.3}}}},
    {"ends": {"covers": {"plate": {"number": 2}}}},
    {"ends": {"runs": {"runs": [RUN, RUN | {"mark": "toe", "y_1": "90 mm", "y_2": "90 mm"}]}}},
    {"ends": {"pinned": {"pin_f_y": "355 MPa", "rotates": False}}},
    {"ends": {"rod": {"fork_capacity": "140 kN", "certified_by": "test 4"}}},
    {"members": {"RB1": {"service_force": "90 kN", "across": {"load": None, "span": "3 m"}}}},
    {"members": {"RB1": {"across": None, "overstrength": None, "service_force": None}}},
    {"members": {"RB2": {"ties": "800 mm", "across": ACROSS, "overstrength": OVERSTRENGTH}}},
]


def _after(data: Any, changes: Data) -> Any:
    """The data with changes brought in, a list whole, members by their marks."""
    for key, value in changes.items():
        if key == "members":
            for member in data[key]:
                _after(member, value.get(member["mark"], {}))
        elif value is None:
            del data[key]
        elif isinstance(value, dict):
            _after(data.setdefault(key, {}), value)
        else:
            data[key] = value
    return data


INLINE = """\
# The bracing of the canopy.
[project]
job_number = "J-1"
title = "Test"
[standard]
name = "AS 4100"
[ends]
{ends}
[[members]]  # the first
{first}
[[members]]
{second}
"""


def _value(value: Any) -> str:
    if isinstance(value, dict):
        return "{ " + ", ".join(f"{key} = {_value(one)}" for key, one in value.items()) + " }"
    if isinstance(value, list):
        return "[" + ", ".join(map(_value, value)) + "]"
    return tomlkit.item(value).as_string()


def _inline() -> str:
    """The same file with every table within a line, as people write the short ones."""

    def pairs(table: Data) -> str:
        return "\n".join(f"{key} = {_value(value)}" for key, value in table.items())

    ends = "\n".join(f"{name} = {_value(end)}  # {name}" for name, end in FILE["ends"].items())
    return INLINE.format(ends=ends, first=pairs(MEMBER), second=pairs(PAIR))


@pytest.mark.parametrize("layout", ["headers", "inline"])
@pytest.mark.parametrize("changes", CHANGES, ids=[str(change)[:60] for change in CHANGES])
def test_a_change_is_made_and_the_rest_stays(tmp_path: Path, layout: str, changes: Data) -> None:
    text = _inline() if layout == "inline" else "# The bracing of the canopy.\n"
    text += "" if layout == "inline" else tomlkit.dumps(FILE)
    _read(tmp_path, text)
    path = tmp_path / "job.toml"
    assert update_design_file(path, changes)
    after = path.read_text(encoding="utf-8")
    assert tomllib.loads(after) == _after(deepcopy(FILE), deepcopy(changes))
    comments = re.compile(r"# .*")
    assert comments.findall(after) == comments.findall(text)
    assert not update_design_file(path, changes) or "None" in str(changes)


def test_quantities_are_written_with_the_unit_of_their_kind(tmp_path: Path) -> None:
    _read(tmp_path)
    changes = {
        "ends": {
            "points": {"plate": {"hanger": {"angle": parse("12.5 deg")}}},
            "pinned": {"pin_f_y": parse("50 ksi").to("ksi")},
        },
        "members": {
            "RB1": {"across": {"load": parse("0.35 kN/m")}, "service_force": parse("9 kN")}
        },
    }
    path = tmp_path / "job.toml"
    assert update_design_file(path, changes)
    data = tomllib.loads(path.read_text(encoding="utf-8"))
    assert data["ends"]["points"]["plate"]["hanger"]["angle"] == "12.5 deg"
    assert data["ends"]["pinned"]["pin_f_y"] == "50 ksi"
    assert data["members"][0]["across"]["load"] == "0.35 kN/m"
    assert data["members"][0]["service_force"] == "9 kN"


@pytest.mark.parametrize(
    ("changes", "place"),
    [
        ({"ends": {"points": {"holes": [LINES, LINES]}}}, "ends.points.holes"),
        ({"ends": {"points": {"plate": {"hanger": {"number": 3}}}}}, "plate.hanger.number"),
        ({"members": {"RB1": {"across": {"sag_limits": "9 mm"}}}}, "across.sag_limits"),
        ({"members": {"RB1": {"service_force": "9 mm"}}}, "members[1].service_force"),
    ],
)
def test_a_file_that_would_not_be_valid_is_not_written(
    tmp_path: Path, changes: Data, place: str
) -> None:
    _read(tmp_path)
    path = tmp_path / "job.toml"
    before = path.read_bytes()
    with pytest.raises(DesignFileError) as caught:
        update_design_file(path, changes)
    assert place in str(caught.value)
    assert path.read_bytes() == before


# The documented layout


def test_the_schema_takes_every_key_and_refuses_bad_ones() -> None:
    jsonschema = pytest.importorskip("jsonschema")
    check = jsonschema.Draft202012Validator(schema.design_file_schema())
    assert list(check.iter_errors(FILE)) == []
    for _, path in TABLES.values():
        data = deepcopy(FILE)
        _at(data, path)["zzzzzz"] = 1
        assert list(check.iter_errors(data)), path
    for table, key, value in (
        ("lines", "per_line", 101),
        ("lines", "at", "50 mm"),
        ("hole", "kind", "slotted"),
        ("hanger", "prying", -0.5),
        ("hanger", "angle", 10),
        ("shape", "corners", [["0 mm"]]),
        ("pinned", "rotates", "no"),
        ("rod", "thread", "M25"),
        ("across", "weight_factor", 3),
        ("overstrength", "category", 3),
        ("covers", "number", 3),
        ("pattern", "kind", "bolted patern"),
    ):
        data = deepcopy(FILE)
        _at(data, TABLES[table][1])[key] = value
        assert list(check.iter_errors(data)), (table, key)


def test_the_ends_and_the_member_in_the_documents_are_designed(tmp_path: Path) -> None:
    text = (DOCS / "design-file.md").read_text(encoding="utf-8")
    blocks = re.findall(r"```toml\n(.*?)```", text, re.DOTALL)
    shown = [block for block in blocks if not block.startswith("# canopy.toml")]
    assert len(shown) == 4
    head = tomlkit.dumps({key: FILE[key] for key in ("project", "standard")})
    design = _read(tmp_path, head + "\n".join(shown))
    kinds = [end.kind for end in design.ends.values()]
    assert kinds == ["bolted pattern", "welded runs", "bolted"]
    assert isinstance(design.ends["hung"].end(), Bolted)
    (calculation,) = check_file(tmp_path / "job.toml")
    assert calculation.heading.mark == "HB1"
    for name in list(design.ends)[:2]:
        update_design_file(
            tmp_path / "job.toml", {"members": {"HB1": {"end": name, "overstrength": None}}}
        )
        assert len(check_file(tmp_path / "job.toml")) == 1
