"""The notebooks, executed headless from top to bottom."""

from __future__ import annotations

import re
from functools import cache
from pathlib import Path

import nbformat
import pytest

from tensionlib.package.execute import execute

FOLDER = Path(__file__).resolve().parents[2] / "notebooks"
NOTEBOOKS = ["one-member", "own-formulas", "schedule-to-package"]
MIMETYPE = "application/vnd.tensionlib+json"


@cache
def _executed(name: str):
    notebook = nbformat.read(FOLDER / f"{name}.ipynb", as_version=4)
    return execute(notebook, FOLDER, name, progress=False)


def _outputs(name: str):
    for cell in _executed(name).cells:
        yield from cell.get("outputs", ())


def _records(name: str) -> list[dict]:
    return [o["data"][MIMETYPE] for o in _outputs(name) if MIMETYPE in o.get("data", {})]


def _calculations(name: str) -> list[dict]:
    found = []
    for record in _records(name):
        found += record["members"] if record["kind"] == "schedule" else []
        found += [record] if record["kind"] == "calculation" else []
    return found


def test_these_are_all_the_notebooks():
    assert sorted(path.stem for path in FOLDER.glob("*.ipynb")) == sorted(NOTEBOOKS)


@pytest.mark.parametrize("name", NOTEBOOKS)
def test_committed_without_outputs(name):
    notebook = nbformat.read(FOLDER / f"{name}.ipynb", as_version=4)
    nbformat.validate(notebook)
    for cell in notebook.cells:
        assert not cell.get("outputs")
        assert cell.get("execution_count") is None


@pytest.mark.parametrize("name", NOTEBOOKS)
def test_runs_without_an_error(name):
    assert not [o for o in _outputs(name) if o.output_type == "error"]


@pytest.mark.parametrize("name", NOTEBOOKS)
def test_no_raw_python_shows(name):
    """No object's address, class or numpy number, and no warning, in what a reader sees."""
    for output in _outputs(name):
        assert output.output_type != "stream" or output.name == "stdout"
        shown = output.get("data", {})
        for kind in ("text/plain", "text/html", "text/latex"):
            assert not re.search(r"np\.float64|object at 0x|<function|nan\b", shown.get(kind, ""))


@pytest.mark.parametrize("name", NOTEBOOKS)
def test_calculations_come_in_every_reading(name):
    bundles = [
        o["data"]
        for o in _outputs(name)
        if o.get("data", {}).get(MIMETYPE, {}).get("kind") == "calculation"
    ]
    assert bundles or name == "schedule-to-package"
    for bundle in bundles:
        assert {"text/plain", "text/html", "text/latex", MIMETYPE} <= set(bundle)


def test_the_schedule_holds_the_canopy_and_all_of_it_passes():
    members = _calculations("schedule-to-package")
    assert len(members) >= 14
    assert all(m["verdict"]["passes"] for m in members)
    shapes = " ".join(m["subject"] for m in members)
    for kind in ("UA", "EA", "PFC", "RB", "CHS", "RHS", "FL", "BT", "2/"):
        assert kind in shapes
    used = [m["verdict"]["governing"]["utilisation"] for m in members]
    assert 0.4 < min(used)
    assert max(used) <= 1.0


def test_the_same_mark_is_the_same_member_in_every_notebook():
    schedule = {m["mark"]: m for m in _calculations("schedule-to-package")}
    one = {m["mark"]: m for m in _calculations("one-member")}["RB1"]
    assert one["subject"] == schedule["RB1"]["subject"]
    assert one["values"]["N*"] == schedule["RB1"]["values"]["N*"]
    for check, again in zip(one["checks"], schedule["RB1"]["checks"], strict=True):
        assert check["utilisation"] == again["utilisation"]
    own = {m["mark"]: m for m in _calculations("own-formulas")}["RB3"]
    assert own["subject"] == schedule["RB3"]["subject"]


def test_own_formulas_lead_the_calculation_and_a_handcalcs_cell_stands_beside():
    own = _calculations("own-formulas")[0]
    assert own["parts"][0]["title"] == "Wind on the east bay"
    latex = [
        o["data"]["text/latex"]
        for o in _outputs("own-formulas")
        if "data" in o and "text/latex" in o["data"]
    ]
    cell = next(text for text in latex if "margin" in text)
    assert r"\text{kN}" in cell
    assert r"\mu" not in cell
