"""The notebooks, executed headless from top to bottom."""

from __future__ import annotations

import re
from functools import cache
from math import ceil
from pathlib import Path

import nbformat
import pytest

from tensionlib.package.execute import execute

FOLDER = Path(__file__).resolve().parents[2] / "notebooks"
NOTEBOOKS = ["joint-studies", "one-member", "own-formulas", "schedule-to-package"]
MIMETYPE = "application/vnd.tensionlib+json"
# What Python shows of an object that has no reading of its own, and numbers that are none.
RAW = re.compile(r"np\.float64|object at 0x|<(?:tensionlib|function|class|IPython|bound)\b|\bnan\b")


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


def _seen(output) -> str:
    """What a reader sees of an output: a stream's text, else its richest reading."""
    if output.output_type == "stream":
        return output.text
    data = output.get("data", {})
    kinds = ("text/html", "text/markdown", "text/latex", "text/plain")
    return next((data[kind] for kind in kinds if kind in data), "")


@pytest.mark.parametrize("name", NOTEBOOKS)
def test_no_raw_python_shows(name):
    """No object's address, class or numpy number, and no warning, in what a reader sees."""
    for output in _outputs(name):
        assert output.output_type != "stream" or output.name == "stdout"
        assert not RAW.search(_seen(output))
        if MIMETYPE in output.get("data", {}):
            for kind in ("text/plain", "text/latex"):
                assert not RAW.search(output["data"].get(kind, ""))


@pytest.mark.parametrize(
    ("text", "raw"),
    [
        ("<tensionlib.members.member.Member object at 0x7f>", True),
        ("<IPython.core.display.Latex object>", True),
        ("np.float64(3.0)", True),
        ("utilisation nan", True),
        ("the tenant of <b>RB1</b>, 277.88 kN", False),
    ],
)
def test_raw_python_would_be_seen(text, raw):
    assert bool(RAW.search(text)) == raw


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
    assert 0.45 < min(used) < 0.6
    assert 0.9 < max(used) < 0.98
    for member in members:
        assert member["values"]["N*"]["unit"] == "kN"
        assert 20 <= member["values"]["N*"]["value"] <= 600


def test_one_end_pair_differs_and_one_pattern_is_staggered():
    schedule = {m["mark"]: m for m in _calculations("schedule-to-package")}
    parts = {check["part"] for check in schedule["RB5"]["checks"]}
    assert {"End 1: Bolts", "End 2: Welds"} <= parts
    texts = {i["meaning"]: i["text"] for i in schedule["RB6"]["inputs"]}
    assert texts["set-back of the second line (stagger)"] == "40 mm"


def test_the_factor_stated_for_a_slotted_tube_is_printed_with_its_reason():
    schedule = {m["mark"]: m for m in _calculations("schedule-to-package")}
    for mark in ("WB1", "WB2"):
        stated = next(i for i in schedule[mark]["inputs"] if i["symbol"] == "k_te")
        assert stated["text"] == "0.8"
        assert "weld 1." in stated["origin"]


def test_the_same_mark_is_the_same_member_in_every_notebook():
    schedule = {m["mark"]: m for m in _calculations("schedule-to-package")}
    one = {m["mark"]: m for m in _calculations("one-member")}["RB1"]
    assert one["subject"] == schedule["RB1"]["subject"]
    assert one["values"]["N*"] == schedule["RB1"]["values"]["N*"]
    for check, again in zip(one["checks"], schedule["RB1"]["checks"], strict=True):
        assert check["utilisation"] == again["utilisation"]
    own = {m["mark"]: m for m in _calculations("own-formulas")}["RB3"]
    assert own["subject"] == schedule["RB3"]["subject"]
    # The schedule carries the force of the wind rounded up to the next 5 kN.
    wind = own["values"]["N*"]["value"]
    assert schedule["RB3"]["values"]["N*"]["value"] == 5 * ceil(wind / 5)
    for key in ("A_g", "L", "t_p"):
        assert own["values"][key] == schedule["RB3"]["values"][key]


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


def test_each_joint_study_ends_as_its_words_say():
    found = {c["mark"]: c for c in _calculations("joint-studies")}
    governing = {mark: c["verdict"]["governing"]["name"] for mark, c in found.items()}
    assert governing == {
        "JS1": "net section rupture",
        "JS2": "block shear",
        "RB2": "least edge distance, member end",
        "JS4": "weld, most stressed point",
        "JS5": "net section rupture",
        "JS6": "area beyond the hole",
        "JS7": "net section rupture",
    }
    fails = {mark for mark, c in found.items() if not c["verdict"]["passes"]}
    assert fails == {"RB2"}
    for mark in ("JS1", "JS2", "RB2", "JS7"):
        titles = [sketch["title"] for sketch in found[mark]["sketches"]]
        assert len(titles) >= 3
    said = "".join(_seen(output) for output in _outputs("joint-studies"))
    assert "utilisation 0.864" in said
