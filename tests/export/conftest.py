"""Records and notebooks for the tests of the package, made by hand in the record's format."""

from __future__ import annotations

from types import SimpleNamespace
from typing import Any

import pytest

nbformat = pytest.importorskip("nbformat")

MIMETYPE = "application/vnd.tensionlib+json"


def line(kind: str, title: str, latex: str = "", *steps: str, **more: Any) -> dict[str, Any]:
    row = {
        "kind": kind,
        "title": title,
        "symbol": latex,
        "latex": latex,
        "steps": list(steps),
        "text": title,
        "clause": "",
        "note": "",
    }
    return {**row, **more}


def member_lines() -> list[dict[str, Any]]:
    return [
        line(
            "upto",
            "yield stress",
            "f_{y}",
            r"300\ \text{MPa}",
            clause="2.1.1",
            note="300: t = 10 mm ≤ 11 mm (AS/NZS 3679.1)",
        ),
        line(
            "formula",
            "net area",
            "A_{n}",
            r"A_{g} - n_{h} \cdot d_{h} \cdot t",
            r"1860\ \text{mm}^{2} - 1 \cdot 22\ \text{mm} \cdot 10\ \text{mm}",
            r"1640\ \text{mm}^{2}",
            clause="7.2",
        ),
        line("fixed", "correction factor", "k_{te}", "0.85", clause="7.3.2", note="one leg"),
        line(
            "formula",
            "design capacity, net section rupture",
            r"\phi N_{t}",
            r"\phi \cdot 0.85 \cdot k_{te} \cdot A_{n} \cdot f_{u}",
            r"0.9 \cdot 0.85 \cdot 0.85 \cdot 1640\ \text{mm}^{2} \cdot 440\ \text{MPa}",
            r"469.24\ \text{kN}",
            clause="7.2",
        ),
        line(
            "extreme",
            "design capacity",
            r"\phi N_{t}",
            r"\min\left(\phi N_{ty},\ \phi N_{tu}\right)",
            r"\min\left(502.2\ \text{kN},\ 469.24\ \text{kN}\right)",
            r"469.24\ \text{kN}",
            note="φN_tu rules",
            clause="7.2",
        ),
        line(
            "check",
            "net section rupture",
            "",
            r"N^{*} \leq \phi N_{t}",
            r"285\ \text{kN} \leq 469.24\ \text{kN}",
            clause="7.1",
            utilisation_text="0.607",
            verdict="pass",
        ),
    ]


def bolt_lines() -> list[dict[str, Any]]:
    return [
        line(
            "holds",
            "short joint",
            "",
            r"L_{j} \leq 300\ \text{mm}",
            r"140\ \text{mm} \leq 300\ \text{mm}",
            clause="9.3.2.1",
            note="so k_r = 1.0",
        ),
        line(
            "formula",
            "design capacity of one bolt in shear",
            r"\phi V_{f}",
            r"\phi \cdot 0.62 \cdot f_{uf} \cdot k_{r} \cdot A_{c}",
            r"0.8 \cdot 0.62 \cdot 830\ \text{MPa} \cdot 1 \cdot 225\ \text{mm}^{2}",
            r"92.628\ \text{kN}",
            clause="9.3.2.1",
        ),
        line(
            "formula",
            "slenderness of the plate strip",
            r"\lambda_{n}",
            r"\frac{L_{e}}{r} \cdot \sqrt{\frac{f_{y}}{250\ \text{MPa}}}",
            r"\frac{180\ \text{mm}}{3.4641\ \text{mm}} \cdot \sqrt{\frac{250\ \text{MPa}}"
            r"{250\ \text{MPa}}}",
            "51.962",
            clause="6.3.3",
        ),
        line("note", "Threads are taken in the shear plane."),
    ]


def svg(width: int = 320, height: int = 140, text: str = "70 mm") -> str:
    return (
        f'<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 {width} {height}">'
        f'<rect x="10" y="20" width="{width - 20}" height="{height - 40}" fill="none"'
        ' stroke="#222" stroke-width="1.2"/><circle cx="60" cy="70" r="9" fill="none"'
        ' stroke="#222"/><circle cx="130" cy="70" r="9" fill="none" stroke="#222"/>'
        f'<text x="95" y="60" font-size="9" font-family="sans-serif" text-anchor="middle">{text}'
        "</text></svg>"
    )


def check(name: str, used: float | None, verdict: str = "pass", **more: Any) -> dict[str, Any]:
    row = {
        "part": "Member",
        "name": name,
        "clause": "7.2",
        "kind": "strength",
        "demand": 285.0,
        "capacity": 326.4,
        "unit": "kN",
        "demand_text": "285 kN",
        "capacity_text": "326.4 kN",
        "utilisation": used,
        "utilisation_text": "" if used is None else f"{used:.3f}",
        "verdict": verdict,
        "note": "",
    }
    return {**row, **more}


def calculation(mark: str = "RB1", title: str = "roof brace", **more: Any) -> dict[str, Any]:
    """A calculation that passes; give word="FAIL" or "NOT COVERED" for one that does not."""
    word = more.pop("word", "PASS")
    used = {"PASS": 0.873, "FAIL": 1.204, "NOT COVERED": 0.61}[word]
    checks = [
        check("net section rupture", used, "pass" if used <= 1 else "fail"),
        check("gross section yield", 0.567),
        check("bolt shear", 0.769, part="Bolts", clause="9.3.2.1"),
        check(
            "pitch of bolts",
            0.714,
            part="Bolts",
            kind="detailing",
            clause="9.6.1",
            demand_text="50 mm",
            capacity_text="70 mm",
            note="2.5 diameters",
        ),
    ]
    governing = {
        "part": "Member",
        "name": "net section rupture",
        "clause": "7.2",
        "utilisation": used,
        "text": f"{used:.3f}",
    }
    by = "governed by" if word == "PASS" else "by"
    headline = (
        f"{mark}: 150x90x10 UA, AS/NZS 3679.1 300, N* = 285 kN: {word}, {by} net section rupture"
        f" (7.2), utilisation {used:.3f}"
    )
    parts = [
        {"title": "Member", "lines": member_lines()},
        {"title": "Bolts", "lines": bolt_lines()},
    ]
    if word == "NOT COVERED":
        checks.append(
            check(
                "block shear of a staggered pattern",
                None,
                "not covered",
                demand_text="",
                capacity_text="",
                part="Gusset",
                clause="9.1.9",
            )
        )
        parts.append(
            {
                "title": "Gusset",
                "lines": [
                    line(
                        "not covered",
                        "block shear of a staggered pattern",
                        clause="9.1.9",
                        note="this pattern has no rule in the clause",
                    ),
                ],
            }
        )
        headline = (
            f"{mark}: 150x90x10 UA, AS/NZS 3679.1 300, N* = 285 kN: NOT COVERED,"
            " block shear of a staggered pattern (9.1.9)"
        )
    record = {
        "format": "tensionlib",
        "version": 1,
        "kind": "calculation",
        "mark": mark,
        "title": title,
        "subject": "150x90x10 UA, AS/NZS 3679.1 300",
        "standard": {"name": "NZS 3404:Part 1:1997", "key": "nzs3404"},
        "headline": headline,
        "verdict": {"passes": word == "PASS", "word": word, "governing": governing},
        "inputs": [
            {
                "symbol": "N*",
                "latex": "N^{*}",
                "meaning": "design tension force",
                "text": "285 kN",
                "latex_value": r"285\ \text{kN}",
                "value": 285.0,
                "unit": "kN",
                "origin": "schedule row 3",
            },
            {
                "symbol": "A_g",
                "latex": "A_{g}",
                "meaning": "gross area of the cross-section",
                "text": "1860 mm²",
                "latex_value": r"1860\ \text{mm}^{2}",
                "value": 1860.0,
                "unit": "mm2",
                "origin": "150x90x10 UA",
            },
            {
                "symbol": "t",
                "latex": "t",
                "meaning": "thickness of the connected leg",
                "text": "10 mm",
                "latex_value": r"10\ \text{mm}",
                "value": 10.0,
                "unit": "mm",
                "origin": "150x90x10 UA",
            },
        ],
        "parts": parts,
        "checks": checks,
        "assumptions": ["both ends are connected in the same way"],
        "not_checked": ["fatigue", "corrosion allowance"],
        "notation": [
            {
                "symbol": "A_n",
                "latex": "A_{n}",
                "meaning": "net area of the cross-section",
                "unit": "mm²",
            },
            {"symbol": "N*", "latex": "N^{*}", "meaning": "design tension force", "unit": "kN"},
            {
                "symbol": "φN_t",
                "latex": r"\phi N_{t}",
                "meaning": "design capacity of the member",
                "unit": "kN",
            },
        ],
        "sources": [
            {
                "name": "NZS 3404:Part 1:1997",
                "use": "member and connection design",
                "known": "from memory; compare with a printed copy",
            },
            {"name": "AS/NZS 3679.1", "use": "section: 300", "known": "from memory"},
        ],
        "sketches": [
            {"title": "End connection", "svg": svg(), "alt": "an angle with two bolts in line"},
        ],
        "values": {"A_n": {"value": 1640.0, "unit": "mm2"}},
        "provenance": {"version": "0.1.0", "inputs_hash": f"sha256:{mark.encode().hex():0<64}"},
    }
    return {**record, **more}


def schedule(members: list[dict[str, Any]], **more: Any) -> dict[str, Any]:
    record = {
        "format": "tensionlib",
        "version": 1,
        "kind": "schedule",
        "title": "Braces of the canopy",
        "source": {"design_file": "canopy.toml", "schedule": "members.csv"},
        "members": members,
    }
    return {**record, **more}


def project(**more: Any) -> dict[str, Any]:
    record = {
        "format": "tensionlib",
        "version": 1,
        "kind": "project",
        "job_number": "4711",
        "title": "Canopy at the east entrance",
        "client": "The client",
        "site": "12 Example Street",
        "made_by": "A. Maker",
        "checked_by": "B. Checker",
        "approved_by": "",
        "status": "draft",
        "revision": "B",
        "date": "2026-03-05",
        "revisions": [
            {
                "revision": "A",
                "date": "2026-02-11",
                "description": "first issue",
                "made_by": "A. Maker",
                "checked_by": "B. Checker",
            },
            {
                "revision": "B",
                "date": "2026-03-05",
                "description": "brace RB2 enlarged",
                "made_by": "A. Maker",
                "checked_by": "B. Checker",
            },
        ],
        "standard": "NZS 3404",
        "paper": "A4",
        "design_file": "canopy.toml",
        "notes": ["Forces are from the frame analysis of the main structure."],
    }
    return {**record, **more}


def shown(record: dict[str, Any]) -> Any:
    """The output of a cell whose last line shows an object with this record."""
    return nbformat.v4.new_output(
        "execute_result",
        {
            MIMETYPE: record,
            "text/plain": "text of the record",
            "text/html": "<b>html</b>",
            "text/latex": r"$never\ printed$",
        },
        execution_count=1,
    )


def code(*outputs: Any, source: str = "show()", tags: tuple[str, ...] = ()) -> Any:
    cell = nbformat.v4.new_code_cell(source, execution_count=1, outputs=list(outputs))
    if tags:
        cell.metadata["tags"] = list(tags)
    return cell


def markdown(text: str, **more: Any) -> Any:
    return nbformat.v4.new_markdown_cell(text, **more)


def notebook(*cells: Any) -> Any:
    """An executed notebook; cell ids are its places, so that it is the same every time."""
    made = nbformat.v4.new_notebook(cells=list(cells))
    for place, cell in enumerate(made.cells, start=1):
        cell["id"] = f"c{place}"
    made.metadata["kernelspec"] = {
        "name": "python3",
        "display_name": "Python 3",
        "language": "python",
    }
    return made


@pytest.fixture(scope="session")
def make() -> SimpleNamespace:
    """Builders of records, cells and notebooks."""
    return SimpleNamespace(
        calculation=calculation,
        check=check,
        code=code,
        line=line,
        markdown=markdown,
        mimetype=MIMETYPE,
        notebook=notebook,
        output=nbformat.v4.new_output,
        project=project,
        schedule=schedule,
        shown=shown,
        svg=svg,
    )
