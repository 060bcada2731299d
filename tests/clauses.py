"""docs/clauses.md, made from the code: every clause formula, how it is known, who checks it.

    python -m tests.clauses            write the page
    python -m tests.clauses --check    say whether the page is the one the code gives

Which published tests exercise a formula is found by running tests/published with a hook that sees
which formulas' code runs. Formulas are found by walking the package: there is no list to keep.
"""

from __future__ import annotations

import argparse
import contextlib
import io
import pkgutil
import re
import sys
from collections import defaultdict
from importlib import import_module
from pathlib import Path
from types import CodeType
from typing import Any

import pytest

import tensionlib.standards
from tensionlib.calculation.formula import Condition, Formula
from tensionlib.standards import standard

ROOT = Path(__file__).resolve().parents[1]
PAGE = ROOT / "docs" / "clauses.md"
PUBLISHED = ROOT / "tests" / "published"

EDITIONS = ("NZS 3404:1997", "AS 4100:1998", "AS 4100:2020")
GROUPS = (
    ("Members: sections 5 to 8", r"^([5-8])\b|Table 5\.2|Table 7\."),
    ("Connections in general: 9.1", r"9\.1\."),
    ("Bolts: 9.3, 9.4", r"9\.3\.|9\.4"),
    ("Pins: 9.5", r"9\.5\."),
    ("Distances: 9.6", r"9\.6\."),
    ("Welds: 9.7", r"9\.7\."),
    ("Holes: section 14", r"14\."),
    ("Earthquake: section 12", r"section 12"),
    ("Practice and statics", r""),
)


def found() -> list[tuple[str, Formula | Condition]]:
    """Every formula and condition of the standards, by its place in the package."""
    things: dict[int, tuple[str, Formula | Condition]] = {}
    for module in pkgutil.walk_packages(tensionlib.standards.__path__, "tensionlib.standards."):
        for name, value in vars(import_module(module.name)).items():
            if isinstance(value, Formula | Condition):
                where = value.function.__module__.removeprefix("tensionlib.standards.")
                things.setdefault(id(value), (f"{where}.{name}", value))
    return sorted(things.values(), key=lambda thing: thing[0])


def exercised(things: list[tuple[str, Formula | Condition]]) -> dict[str, set[str]]:
    """By formula, the files of published tests in which its code runs."""
    codes: dict[CodeType, str] = {thing.function.__code__: name for name, thing in things}
    by: dict[str, set[str]] = defaultdict(set)
    now = [""]

    def hook(frame: Any, event: str, arg: Any) -> None:
        if event == "call" and frame.f_code in codes and now[0]:
            by[codes[frame.f_code]].add(now[0])

    class Plugin:
        @pytest.hookimpl(hookwrapper=True)
        def pytest_runtest_call(self, item: pytest.Item) -> Any:
            now[0] = item.path.name
            sys.setprofile(hook)
            try:
                yield
            finally:
                sys.setprofile(None)
                now[0] = ""

        @pytest.hookimpl(hookwrapper=True)
        def pytest_make_collect_report(self, collector: pytest.Collector) -> Any:
            # Some files work their figures out while they are read.
            now[0] = collector.path.name if collector.path.suffix == ".py" else ""
            sys.setprofile(hook)
            try:
                yield
            finally:
                sys.setprofile(None)
                now[0] = ""

    with contextlib.redirect_stdout(io.StringIO()):
        code = pytest.main([str(PUBLISHED), "-q", "-p", "no:cacheprovider"], plugins=[Plugin()])
    if code != 0:
        raise SystemExit("tests/published does not pass: no page is written")
    return by


def _equation(thing: Formula | Condition) -> str:
    names = {name: thing.notation[name].text for name in thing.parameters}
    names |= {name: constant.text for name, constant in thing.constants.items()}
    if isinstance(thing, Condition):
        return f"{names[thing.left]} {thing.sign[0]} {names[thing.right]}"
    return f"{thing.gives.text} = {thing.template.text_symbolic(names)}"


def _clauses(name: str, clause: str) -> tuple[str, ...]:
    """The clause as each edition numbers it; "" where the formula is not that standard's."""
    folder = name.partition(".")[0]
    numbers = []
    for edition in EDITIONS:
        chosen = standard(edition)
        own = folder in ("common_as_nzs", chosen.key)
        numbers.append(chosen.notation.cite(clause) or "statics" if own else "")
    return tuple(numbers)


def _known(thing: Formula | Condition) -> str:
    return thing.known if isinstance(thing, Formula) else thing.notation.source.known


def _cell(text: str) -> str:
    return text.replace("|", "\\|").replace("*", "\\*").replace("_", "\\_")


def _group(clause: str) -> str:
    return next(title for title, pattern in GROUPS if re.search(pattern, clause))


def page(things: list[tuple[str, Formula | Condition]], by: dict[str, set[str]]) -> str:
    """The page's text."""
    unchecked = [name for name, _ in things if not by.get(name)]
    lines = [
        "# Clauses",
        "",
        "Made from the code by `python -m tests.clauses`. Every formula and condition of the",
        "standards stands here with its clause in each edition, how the library knows it, and the",
        "published tests in which it runs. Equations print the common symbols; a calculation",
        "prints those of its own standard (k_te for k_t in NZS 3404). Running in a published test",
        "means that a figure somebody else printed depends on the formula, not that all of it was",
        "compared.",
        "",
        f"{len(things) - len(unchecked)} of {len(things)} formulas and conditions run in tests of",
        f"published figures; {len(unchecked)} have no outside check.",
        "",
    ]
    rows: dict[str, list[str]] = defaultdict(list)
    for name, thing in things:
        checked = ", ".join(
            f"[{file.removeprefix('test_').removesuffix('.py')}](../tests/published/{file})"
            for file in sorted(by.get(name, ()))
        )
        numbers = " | ".join(_cell(number) for number in _clauses(name, thing.clause))
        rows[_group(thing.clause)].append(
            f"| {_cell(_equation(thing))} | {_cell(thing.title)} | {numbers} |"
            f" {_cell(_known(thing))} | {checked or 'no outside check'} |"
        )
    head = "| Equation | What it is | " + " | ".join(EDITIONS) + " | Known | Published tests |"
    for title, _ in GROUPS:
        if rows[title]:
            lines += [f"## {title}", "", head, "|---|---|---|---|---|---|---|", *rows[title], ""]
    lines += ["## Tabulated values", "", *_tables(), "", "## Without an outside check", ""]
    lines += [f"- `{name}`" for name in unchecked]
    return "\n".join(lines) + "\n"


def _tables() -> list[str]:
    from tensionlib.standards.as4100.rules import RULES_2020
    from tensionlib.standards.common_as_nzs import (
        bending,
        detailing,
        gusset_in_compression,
        hole_sizes,
        pattern,
        pins,
        tension,
        welds,
    )
    from tensionlib.standards.nzs3404 import bearing, overstrength
    from tensionlib.standards.nzs3404.rules import RULES

    rows = ["| Value | Clause | Known |", "|---|---|---|"]

    def row(value: str, clause: str, known: str) -> None:
        rows.append(f"| {_cell(value)} | {clause} | {known} |")

    sure, fairly = "from memory, sure", "from memory, fairly sure"
    for rules, known in ((RULES, "read in a printed page"), (RULES_2020, sure)):
        f = rules.factors
        row(
            f"φ, {rules.name}: member {f.member:g}, component {f.component:g}, bolt {f.bolt:g},"
            f" pin {f.pin:g}, ply {f.ply:g}, slip {f.slip:g}, fillet"
            + ", ".join(f" {k} {v:g}" for k, v in f.fillet.items()),
            f.clause,
            known,
        )
        row(
            f"φ of block shear, {rules.name}: {rules.block.phi:g}",
            rules.block.clause,
            rules.block.known,
        )
    for case in tension.CASES.values():
        row(f"k_t = {case.k_t:g}: {case.words}", case.clause, case.sure)
    for cut, factor in detailing.EDGE_FACTORS.items():
        row(f"least edge over bolt diameter {factor:g}: {cut}", "Table 9.6.2", sure)
    row(f"greatest pitch {detailing.PITCH_LIMIT:g} mm", "9.6.3", sure)
    row(f"greatest edge distance {detailing.EDGE_LIMIT:g} mm", "9.6.4", sure)
    for limit, leg in welds.LEAST_LEGS:
        row(
            f"least leg {leg:g} mm to {limit:g} mm of the thickest part",
            "Table 9.7.3.2",
            "from memory, sure",
        )
    for kind, factor in pattern.SLIP_FACTORS.items():
        row(f"k_h = {factor:g}: {kind} hole", "9.3.3.1", sure)
    for kind in pattern.SLIP_FACTORS:
        width, length = hole_sizes.hole_size(20.0, kind)
        row(f"hole for M20, {kind}: {width:g} by {length:g} mm", "14.3.5.2", sure)
    for rotates, factor in pins.ROTATION_FACTORS.items():
        row(f"k_p = {factor:g}, the pin rotates: {rotates}", "9.5.2", sure)
    row(
        f"λ_ey = {bending.OUTSTAND_LIMIT:g}, outstand of a hot-rolled section",
        "Table 5.2",
        "from memory, sure",
    )
    row(
        f"α_b = {gusset_in_compression.SECTION_CONSTANT:g}, plate",
        "6.3.3",
        "from memory, fairly sure",
    )
    row(f"C_1 = {bearing.FACTOR:g}, NZS 3404", "9.3.2.4", fairly)
    for category, factor in overstrength.FACTORS.items():
        row(f"φ_oms = {factor:g}, category {category}", overstrength.CLAUSE, "from memory, unsure")
    return rows


def main() -> None:
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--check", action="store_true", help="exit with 1 where the page differs")
    asked = parser.parse_args()
    things = found()
    text = page(things, exercised(things))
    if not asked.check:
        PAGE.write_text(text, encoding="utf-8")
    elif PAGE.read_text(encoding="utf-8") != text:
        raise SystemExit("docs/clauses.md is not what the code gives: run python -m tests.clauses")


if __name__ == "__main__":
    main()
