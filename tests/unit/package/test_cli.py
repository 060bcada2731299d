"""The command line, called as a user calls it: what it prints and how it exits."""

from __future__ import annotations

import json

import pytest

from tensionlib.package.cli import BAD_INPUT, FAILS, PASSES, main

DESIGN = """
[project]
job_number = "T-1"
title = "Two braces"

[standard]
name = "NZS 3404"

[ends.three]
kind = "bolted"
to = "leg"
bolts = "M20 8.8/S"
threads = "in shear plane"
per_line = 3
pitch = "70 mm"
gauge = "55 mm"
end_distance = "40 mm"
plate = { thickness = "12 mm", steel = "AS/NZS 3678 250" }

[[members]]
mark = "B1"
section = "100x100x10 EA"
steel = "AS/NZS 3679.1 300"
length = "4.2 m"
force = "FORCE"
end = "three"

[[members]]
mark = "B2"
section = "100x100x12 EA"
steel = "AS/NZS 3679.1 300"
length = "4.2 m"
force = "120 kN"
end = "three"
"""


@pytest.fixture
def design_file(tmp_path):
    def write(force="250 kN", text=DESIGN):
        path = tmp_path / "braces.toml"
        path.write_text(text.replace("FORCE", force), encoding="utf-8")
        return str(path)

    return write


def test_check_prints_the_summary_and_passes(design_file, capsys):
    assert main(["check", design_file()]) == PASSES
    out = capsys.readouterr().out
    assert "B1" in out
    assert "100x100x10 EA" in out
    assert "bolt shear" in out
    assert "0.900" in out  # 250 kN on 0.8 x 3 x 0.62 x 830 MPa x 225 mm2 = 277.9 kN
    assert out.startswith("T-1 Two braces\nbraces.toml, draft, to NZS 3404\n")
    assert out.rstrip().endswith("2 members: all pass; highest utilisation 0.900 (B1)")


def test_check_exits_1_when_a_check_fails(design_file, capsys):
    assert main(["check", design_file("300 kN")]) == FAILS
    out = capsys.readouterr().out
    assert "FAIL" in out
    assert "2 members: 1 not passing, 1 pass; highest utilisation 1.080 (B1)" in out


def test_advice_that_is_exceeded_is_told_and_decides_nothing(design_file, capsys):
    assert main(["check", design_file(text=DESIGN.replace("4.2 m", "9 m"))]) == PASSES
    assert "advice exceeded, slenderness: B1 B2" in capsys.readouterr().out


def test_check_json_has_the_promised_layout(design_file, capsys):
    assert main(["check", design_file(), "--json"]) == PASSES
    members = json.loads(capsys.readouterr().out)["members"]
    assert [m["mark"] for m in members] == ["B1", "B2"]
    first = members[0]
    assert first["standard"].startswith("NZS 3404")
    assert first["governing"] == "bolt shear"
    check = next(c for c in first["checks"] if c["name"] == "bolt shear")
    assert check["clause"] == "9.3.2.1"
    assert check["unit"] == "kN"
    assert check["demand"] == 250.0
    assert check["capacity"] == pytest.approx(0.8 * 3 * 0.62 * 830 * 225 / 1000)
    assert check["utilisation"] == pytest.approx(250.0 / check["capacity"])
    assert check["verdict"] == "pass"
    assert first["values"]["N*"] == {"value": 250.0, "unit": "kN"}
    assert first["values"]["d_h"] == {"value": 22.0, "unit": "mm"}


@pytest.mark.parametrize(
    ("force", "says"),
    [
        ("250", "without a unit"),
        ("250 mm", "a length"),
        ("-250 kN", "compression"),
        ("lots", "lots"),
    ],
)
def test_check_exits_2_on_bad_input(design_file, capsys, force, says):
    assert main(["check", design_file(force)]) == BAD_INPUT
    err = capsys.readouterr().err
    assert "braces.toml" in err
    assert says in err


def test_check_lists_every_member_that_cannot_be_designed(design_file, capsys):
    text = DESIGN.replace('gauge = "55 mm"', 'gauge = "95 mm"')
    assert main(["check", design_file(text=text)]) == BAD_INPUT
    err = capsys.readouterr().err
    assert "B1" in err
    assert "B2" in err
    assert "the hole leaves the leg, 100 mm wide" in err


def test_good_rows_are_reported_on_request(design_file, capsys):
    text = DESIGN.replace('section = "100x100x12 EA"', 'section = "130x12 FL"')
    assert main(["check", design_file(text=text)]) == BAD_INPUT
    capsys.readouterr()
    assert main(["check", design_file(text=text), "--good-rows"]) == BAD_INPUT
    captured = capsys.readouterr()
    assert "B1" in captured.out
    assert "B2" in captured.err
    assert "can be bolted by its 'plate'" in captured.err


def test_sections_by_name_and_by_search(capsys):
    assert main(["sections", "150 x 90 x 10 ua"]) == PASSES
    assert "150x90x10 UA" in capsys.readouterr().out
    assert main(["sections", "--family", "EA", "--leg", "100 mm", "--min-area", "1600 mm2"]) == 0
    out = capsys.readouterr().out
    assert "100x100x10 EA" in out
    assert "100x100x8 EA" not in out
    assert main(["sections", "--family", "EA", "--min-area", "1 m2"]) == PASSES
    assert "no section fits" in capsys.readouterr().out


def test_sections_bad_input(capsys):
    assert main(["sections", "150x90x11 UA"]) == BAD_INPUT
    assert "Did you mean '150x90x1" in capsys.readouterr().err
    assert main(["sections", "--family", "UA", "--min-area", "1500"]) == BAD_INPUT
    assert "--min-area" in capsys.readouterr().err


def test_help_has_examples(capsys):
    for command in ("check", "issue", "sections"):
        with pytest.raises(SystemExit) as stopped:
            main([command, "--help"])
        assert stopped.value.code == 0
        assert f"tensionlib {command}" in capsys.readouterr().out


def test_missing_notebook_is_bad_input(tmp_path, capsys):
    assert main(["issue", str(tmp_path / "none.ipynb"), "--quiet"]) == BAD_INPUT
    assert "none.ipynb" in capsys.readouterr().err
