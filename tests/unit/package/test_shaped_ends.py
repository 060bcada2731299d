"""Ends of every kind, gussets with more to them, and what a member carries, in a design file."""

from __future__ import annotations

from pathlib import Path

import pytest

from tensionlib.joints.holes import Pattern
from tensionlib.joints.pattern_end import BoltedPattern, Covers
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.welded_runs import WeldedRuns
from tensionlib.package.files import DesignFileError, read_design_file
from tensionlib.package.project import check_file

HEAD = """
[project]
job_number = "J-1"
title = "Test"

[standard]
name = "AS 4100"
"""
PLATE = 'plate = { thickness = "12 mm", steel = "AS/NZS 3678 250", width = "260 mm" }'
PATTERN = f"""
[ends."points"]
kind = "bolted pattern"
to = "long leg"
bolts = "M20 8.8/TF"
threads = "in shear plane"
holes = [
    {{ per_line = 3, at = ["60 mm"], end_distance = "40 mm", pitch = "70 mm" }},
    {{ mark = "4", x = "250 mm", y = "60 mm", bolt = false }},
]
{PLATE}
"""
MEMBER = """
[[members]]
mark = "RB1"
section = "150x100x12 UA"
steel = "AS/NZS 3679.1 300"
length = "4 m"
force = "150 kN"
service_force = "100 kN"
end = "points"
across = { load = "0.2 kN/m", sag_limit = "20 mm" }
"""


def read(folder: Path, text: str):
    path = folder / "job.toml"
    path.write_text(HEAD + text, encoding="utf-8")
    return read_design_file(path)


def end(folder: Path, text: str):
    (detail,) = read(folder, text).ends.values()
    return detail.end()


def refused(folder: Path, text: str) -> str:
    with pytest.raises(DesignFileError) as caught:
        read(folder, text)
    return str(caught.value)


def test_a_pattern_of_lines_and_holes(tmp_path):
    found = end(tmp_path, PATTERN)
    assert isinstance(found, BoltedPattern)
    assert [h.mark for h in found.holes.holes] == ["1", "2", "3", "4"]
    assert found.holes.holes[:3] == Pattern.lines(3, ["60 mm"], "40 mm", "70 mm").holes
    assert not found.holes.holes[3].bolt


def test_the_other_kinds(tmp_path):
    runs = end(
        tmp_path,
        '[ends."w"]\nkind = "welded runs"\nto = "plate"\nruns = [{ mark = "a", x_1 = "0 mm",'
        ' y_1 = "0 mm", x_2 = "200 mm", y_2 = "0 mm", leg_size = "6 mm" }]\n' + PLATE,
    )
    assert isinstance(runs, WeldedRuns)
    pinned = end(
        tmp_path,
        '[ends."p"]\nkind = "pinned"\npin = "40 mm"\npin_f_y = "350 MPa"\nhole = "41 mm"\n'
        'edge_beyond = "75 mm"\nplate_edge_beyond = "75 mm"\n' + PLATE,
    )
    assert isinstance(pinned, Pinned)
    rod = end(
        tmp_path,
        '[ends."r"]\nkind = "rod"\nthread = "M24"\nfork_capacity = "130 kN"\n'
        'certified_by = "certificate"\npin = "24 mm"\nhole = "26 mm"\n'
        'plate_edge_beyond = "50 mm"\n' + PLATE,
    )
    assert isinstance(rod, Threaded)


def test_plates_with_more_to_them(tmp_path):
    covers = end(
        tmp_path,
        PATTERN.replace('width = "260 mm"', 'width = "150 mm", number = 2').replace("TF", "S"),
    )
    assert isinstance(covers.plate, Covers)
    shaped = end(
        tmp_path,
        PATTERN.replace(
            PLATE,
            '[ends."points".plate]\nthickness = "12 mm"\nsteel = "AS/NZS 3678 250"\n'
            'compression = "60 kN"\nsupport_leg = "6 mm"\n[ends."points".plate.shape]\n'
            'corners = [["0 mm", "0 mm"], ["420 mm", "0 mm"], ["420 mm", "240 mm"],'
            ' ["0 mm", "240 mm"]]\nsupported = [3]\nmember_at = ["120 mm", "120 mm"]\n'
            'angle = "0 deg"\n[ends."points".plate.hanger]\nbolts = "M20 8.8/TB"\nnumber = 4\n'
            'gauge = "110 mm"\ntributary = "80 mm"\nthickness = "25 mm"\n'
            'steel = "AS/NZS 3678 250"\n',
        ),
    )
    assert shaped.plate.shape.supported == (3,)
    assert shaped.plate.hanger.number == 4


def test_a_member_with_its_loads_is_designed(tmp_path):
    design = read(tmp_path, PATTERN + MEMBER)
    (row,) = design.members
    assert row.across.sag_limit.internal == 20.0
    assert row.service_force.internal == 100e3
    checked = check_file(tmp_path / "job.toml")
    (calc,) = checked.calculations
    names = {check.name for check in calc}
    assert {"slip in service", "tension with bending", "sag"} <= names


def test_a_schedule_states_forces_in_service(tmp_path):
    (tmp_path / "members.csv").write_text(
        "mark,section,steel,length,force,service force,end\n"
        "RB2,150x100x12 UA,AS/NZS 3679.1 300,4 m,150 kN,90 kN,points\n"
        "RB3,150x100x12 UA,AS/NZS 3679.1 300,4 m,150 kN,,points\n",
        encoding="utf-8",
    )
    design = read(tmp_path, PATTERN + '[schedule]\nfile = "members.csv"\n')
    first, second = design.members
    assert first.service_force.internal == 90e3
    assert second.service_force is None


def test_a_detail_is_written_as_it_was_read(tmp_path):
    (detail,) = read(tmp_path, PATTERN).ends.values()
    table = detail.table()
    assert table["kind"] == "bolted pattern"
    assert table["holes"][0]["at"] == ["60 mm"]
    assert table["plate"]["width"] == "260 mm"


@pytest.mark.parametrize(
    ("text", "says"),
    [
        (PATTERN.replace("pitch", "pich"), "pich: is no key of lines"),
        (PATTERN.replace('x = "250 mm", ', ""), "x: missing"),
        (PATTERN.replace("bolt = false", "bolt = 3"), "hole 4: bolt: got 3"),
        (PATTERN.replace("threads", "thread"), "thread"),
        (PATTERN.replace('"bolted pattern"', '"bolted patern"'), "bolted pattern"),
        (PATTERN.replace("M20", "M21"), "M21"),
        (PATTERN + MEMBER.replace("sag_limit", "sag_limits"), "sag_limits"),
        (PATTERN + MEMBER.replace('"0.2 kN/m"', '"0.2 kN"'), "load"),
        (PATTERN + MEMBER.replace("service_force", "service_forces"), "service_forces"),
        (PATTERN.replace('width = "260 mm"', "shape = { corners = [] }"), "shape"),
    ],
)
def test_what_is_wrong_is_named(tmp_path, text, says):
    said = refused(tmp_path, text)
    assert says in said
    assert "line" in said
