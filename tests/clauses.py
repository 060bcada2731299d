"""docs/clauses.md, made from the code: every clause formula, how it is known, who checks it.

    python -m tests.clauses            write the page
    python -m tests.clauses --check    exit with 1 where the page is not the one the code gives

Which published tests exercise a formula is found by running tests/published with a hook that sees
which formulas' code runs. Formulas and fixed values are found by walking the package.
"""

from __future__ import annotations

import argparse
import ast
import contextlib
import inspect
import io
import pkgutil
import re
import sys
from collections import defaultdict
from collections.abc import Iterator, Mapping
from dataclasses import asdict
from importlib import import_module
from pathlib import Path
from types import ModuleType
from typing import Any

import pytest

import tensionlib.standards
from tensionlib.calculation.formula import Condition, Constant, Formula
from tensionlib.calculation.tables import ThresholdTable
from tensionlib.standards import standard
from tensionlib.standards.as4100.rules import RULES_1998, RULES_2020
from tensionlib.standards.common_as_nzs.hole_sizes import hole_size
from tensionlib.standards.common_as_nzs.pattern import SLIP_FACTORS
from tensionlib.standards.common_as_nzs.rules import BlockRule, Factors
from tensionlib.standards.common_as_nzs.tension import ConnectionCase
from tensionlib.standards.nzs3404.rules import RULES

ROOT = Path(__file__).resolve().parents[1]
PAGE = ROOT / "docs" / "clauses.md"
PUBLISHED = ROOT / "tests" / "published"

Things = list[tuple[str, Formula | Condition]]
Runs = Mapping[str, set[str]]

PACKAGE = "tensionlib.standards."
EDITIONS = {"NZS 3404:1997": RULES, "AS 4100:1998": RULES_1998, "AS 4100:2020": RULES_2020}
GROUPS = (
    ("Bending: sections 5 and 8", r"^(Table )?[58]\."),
    ("Compression: section 6", r"^(Table )?6\."),
    ("Tension: section 7", r"^(Table )?7\."),
    ("Connections in general: 9.1", r"^(Table )?9\.1\b"),
    ("Bolts: 9.3 and 9.4", r"^(Table )?9\.[34]\b"),
    ("Pins: 9.5", r"^(Table )?9\.5\b"),
    ("Distances: 9.6", r"^(Table )?9\.6\b"),
    ("Welds: 9.7", r"^(Table )?9\.7\b"),
    ("Practice, statics, and what has no clause", r"^\D*$"),
    ("Other sections", r""),
)
PREAMBLE = """# Clauses

Made by `python -m tests.clauses` from the code and a run of the published tests. Every formula and
condition of the standards stands here with its clause in each edition (a dash: that edition has no
part in it; none: it cites no clause), how the library knows it, and the files of published tests in
which its code runs. That it runs there says that a figure somebody else printed was worked out with
it, not that each of its branches was compared; each file names its sources, and which of them are
known from memory. Symbols are those the two standards share: NZS 3404 prints k_te for k_t.
"""
UNCHECKED = "no outside check"
MEMORY, PRACTICE, COMMON = "from memory", "common practice, no source", "common_as_nzs"
SURE, FAIRLY, UNSURE = f"{MEMORY}, sure", f"{MEMORY}, fairly sure", f"{MEMORY}, unsure"
# What the fixed values of the modules are: words, clause, how known. One that is not told of here
# is listed as such, and a test refuses it.
TOLD = {
    "as4100.rules.FACTORS": ("φ, capacity factor", "Table 3.4", SURE),
    "nzs3404.rules.FACTORS": ("φ, slip by Table 3.3(2)", "Table 3.3(1)", "read in a printed page"),
    "nzs3404.bearing.FACTOR": ("C_1, ply bearing", "9.3.2.4", FAIRLY),
    "nzs3404.overstrength.FACTORS": ("φ_oms by member category", "section 12", UNSURE),
    f"{COMMON}.bending.PLATE_LIMITS": ("λ_ey by kind of plate", "Table 5.2", FAIRLY),
    f"{COMMON}.welds.SHORTEST_LAP": (
        "shortest lap in mm, advice",
        "practice",
        "AISC 360-16 J2.2b, from memory",
    ),
    f"{COMMON}.bending.YOUNG": ("E in MPa", "", SURE),
    f"{COMMON}.block.UNIFORM": ("k_bs, tension uniform", "9.1.9", FAIRLY),
    f"{COMMON}.block.NON_UNIFORM": ("k_bs, tension not uniform", "9.1.9", FAIRLY),
    f"{COMMON}.detailing.PITCH_LIMIT": ("greatest pitch in mm", "9.6.3", MEMORY),
    f"{COMMON}.detailing.EDGE_LIMIT": ("greatest edge distance in mm", "9.6.4", MEMORY),
    f"{COMMON}.detailing.ADVISED_SLENDERNESS": ("advised limit of L/r", "practice", PRACTICE),
    f"{COMMON}.detailing.EDGE_FACTORS": ("k_e, least edge over bolt size", "Table 9.6.2", SURE),
    f"{COMMON}.gusset_in_compression.SECTION_CONSTANT": ("α_b, plate", "6.3.3", FAIRLY),
    f"{COMMON}.gusset_in_compression.YOUNG": ("E in MPa", "", SURE),
    f"{COMMON}.pattern.SLIP_FACTORS": ("k_h by kind of hole", "9.3.3.1", SURE),
    f"{COMMON}.pins.ROTATION_FACTORS": ("k_p, does the pin rotate", "9.5.2", SURE),
    f"{COMMON}.tension.CASES": ("k_t", "Table 7.3.2", "row by row"),
    f"{COMMON}.hole_sizes.CLEARANCES": ("clearance in mm", "14.3.5.2", "by its source"),
    f"{COMMON}.walk_welded.LEGS": ("least leg in mm", "Table 9.7.3.2", "by its source"),
}
TABLES = float | int | Factors | BlockRule | ConnectionCase | ThresholdTable


def modules() -> Iterator[tuple[str, ModuleType]]:
    for module in pkgutil.walk_packages(tensionlib.standards.__path__, PACKAGE):
        yield module.name.removeprefix(PACKAGE), import_module(module.name)


def parsed(module: ModuleType) -> list[ast.stmt]:
    return ast.parse(inspect.getsource(module)).body


def found() -> Things:
    """Every formula and condition of the standards, by its place in the package."""
    things: dict[int, tuple[str, Formula | Condition]] = {}
    for _, module in modules():
        for name, value in vars(module).items():
            if isinstance(value, Formula | Condition):
                where = value.function.__module__.removeprefix(PACKAGE)
                things.setdefault(id(value), (f"{where}.{name}", value))
    return sorted(things.values(), key=lambda thing: thing[0])


def exercised(things: Things) -> Runs:
    """By formula, the files of published tests in which its code runs."""
    codes = {id(thing.function.__code__): name for name, thing in things}
    by: dict[str, set[str]] = defaultdict(set)

    @contextlib.contextmanager
    def watched(file: Path) -> Iterator[None]:
        def hook(frame: Any, event: str, arg: Any) -> None:
            if event == "call" and (name := codes.get(id(frame.f_code))):
                by[name].add(file.name)

        sys.setprofile(hook)
        try:
            yield
        finally:
            sys.setprofile(None)

    class Plugin:
        @pytest.hookimpl(hookwrapper=True)
        def pytest_runtest_protocol(self, item: pytest.Item) -> Any:
            with watched(item.path):
                yield

        @pytest.hookimpl(hookwrapper=True)
        def pytest_make_collect_report(self, collector: pytest.Collector) -> Any:
            # Some files work figures out while they are read.
            with watched(collector.path):
                yield

    said = io.StringIO()
    with contextlib.redirect_stdout(said):
        code = pytest.main([str(PUBLISHED), "-q", "-p", "no:cacheprovider"], plugins=[Plugin()])
    if code != 0:
        raise SystemExit(f"{said.getvalue()}\ntests/published does not pass: no page is made")
    return by


def equation(thing: Formula | Condition) -> str:
    names = {name: thing.notation[name].text for name in thing.parameters}
    names |= {name: constant.text for name, constant in thing.constants.items()}
    if isinstance(thing, Condition):
        return f"{names[thing.left]} {thing.sign[0]} {names[thing.right]}"
    return f"{thing.gives.text} = {thing.template.text_symbolic(names)}"


def clauses(name: str, clause: str) -> str:
    """The cells of the clause as each edition numbers it; a dash where the edition has no part."""
    cells = []
    for edition, rules in EDITIONS.items():
        chosen = standard(edition)
        own = name.startswith(("common_as_nzs.", f"{chosen.key}."))
        # A standard without a rule for block shear writes those lines under a clause of its own.
        said = rules.block.clause if clause == RULES_2020.block.clause else clause
        cells.append((chosen.notation.cite(said) or "none") if own else "–")
    return " | ".join(cells)


def constants() -> Iterator[tuple[str, Any]]:
    """Numbers, and tables of them, that modules hold under a name in capitals."""
    for where, module in modules():
        body = [s for s in parsed(module) if isinstance(s, ast.Assign | ast.AnnAssign)]
        for node in (node for statement in body for node in ast.walk(statement)):
            if isinstance(node, ast.Name) and isinstance(node.ctx, ast.Store) and node.id.isupper():
                value = getattr(module, node.id)
                first = next(iter(value.values())) if isinstance(value, Mapping) else value
                # A Constant is seen in the equations that read it.
                if isinstance(first, TABLES) and not isinstance(first, Constant):
                    yield f"{where}.{node.id}", value


def literals() -> Iterator[tuple[str, str, str, str]]:
    """Numbers a walk writes straight into a calculation: place, what, value, clause."""
    for where, module in modules():
        for function in (s for s in parsed(module) if isinstance(s, ast.FunctionDef)):
            told = {k: repr(v) for k, v in vars(module).items() if isinstance(v, str)}
            for node in ast.walk(function):
                if isinstance(node, ast.Assign):
                    told |= {ast.unparse(name): ast.unparse(node.value) for name in node.targets}
                if not (isinstance(node, ast.Call) and ast.unparse(node.func) == "work.fixed"):
                    continue
                symbol, value, clause = (ast.unparse(arg) for arg in node.args)
                if isinstance(node.args[1], ast.Constant):
                    words = re.findall(r"'(\w+)'", symbol)  # none where a variable holds it
                    words += [ast.literal_eval(k.value) for k in node.keywords if k.arg == "note"]
                    number = ast.literal_eval(told.get(clause, clause))
                    yield f"{where}.{function.name}", ", ".join(words), value, number


def fixed_values() -> Iterator[tuple[str, str, str, str, str]]:
    """Name, what it is, value, clause and how known of every fixed value."""
    for name, value in constants():
        words, clause, known = TOLD.get(name, ("not told", "", "not told"))
        match value:
            case BlockRule():
                yield name, "φ, block shear", f"{value.phi:g}", value.clause, value.known
            case ThresholdTable():
                for of, bands in value.rows.items():
                    steps = ", ".join(f"{band.value:g} up to {band.limit:g}" for band in bands)
                    yield (
                        name,
                        f"{of}, {words}",
                        steps.replace("up to inf", "beyond"),
                        clause,
                        value.source,
                    )
            case Factors():
                numbers = asdict(value) | {f"fillet {k}": v for k, v in value.fillet.items()}
                yield name, words, _listed(numbers), value.clause, known
            case {**cases} if isinstance(next(iter(cases.values())), ConnectionCase):
                for case in cases.values():
                    yield name, f"{words}, {case.words}", f"{case.k_t:g}", case.clause, case.sure
            case {**numbers}:
                yield name, words, _listed(numbers), clause, known
            case number:
                yield name, words, f"{number:g}", clause, known
    for name, words, text, clause in literals():
        yield name, words, text, clause, MEMORY
    for kind in SLIP_FACTORS:
        holes = ((d, *hole_size(d, kind)) for d in (12.0, 16.0, 20.0, 24.0, 30.0, 36.0))
        text = ", ".join(f"M{d:g} {width:g} × {length:g}" for d, width, length in holes)
        words = f"{kind} hole in mm, width × length"
        yield f"{COMMON}.hole_sizes.hole_size", words, text, "14.3.5.2", SURE


def _listed(numbers: Mapping[str, Any]) -> str:
    return ", ".join(f"{key}: {v:g}" for key, v in numbers.items() if isinstance(v, float))


def _order(clause: str) -> list[int]:
    return [int(number) for number in re.findall(r"\d+", clause)]


def page(things: Things, by: Runs) -> str:
    """The page's text."""
    unchecked = [name for name, _ in things if not by.get(name)]
    done = len(things) - len(unchecked)
    lines = [PREAMBLE]
    lines += [f"**{done} of {len(things)} formulas and conditions are exercised by published"]
    lines += [f"figures; {len(unchecked)} have no outside check.**", ""]
    lines += ["## Without an outside check", "", *(f"- `{name}`" for name in unchecked), ""]
    editions = " | ".join(EDITIONS)
    groups: dict[str, Things] = defaultdict(list)
    for name, thing in things:
        title = next(title for title, pattern in GROUPS if re.search(pattern, thing.clause))
        groups[title].append((name, thing))
    for title, _ in GROUPS:
        if not groups[title]:
            continue
        lines += [f"## {title}", ""]
        lines += [f"| Function | Equation | What it is | {editions} | Known | Published tests |"]
        lines += ["|---" * 8 + "|"]
        for name, thing in sorted(groups[title], key=lambda t: (_order(t[1].clause), t[0])):
            checked = ", ".join(
                f"[{file.removeprefix('test_').removesuffix('.py')}](../tests/published/{file})"
                for file in sorted(by.get(name, ()))
            )
            known = thing.known if isinstance(thing, Formula) else thing.notation.source.known
            cells = (f"`{name}`", f"`{equation(thing)}`", thing.title, clauses(name, thing.clause))
            lines.append(f"| {' | '.join(cells)} | {known} | {checked or UNCHECKED} |")
        lines.append("")
    lines += ["## Fixed values", "", f"| Name | What it is | Value | {editions} | Known |"]
    lines += ["|---" * 7 + "|"]
    for name, words, value, clause, known in fixed_values():
        lines += [f"| `{name}` | {words} | {value} | {clauses(name, clause)} | {known} |"]
    return "\n".join(lines) + "\n"


def main() -> None:
    parser = argparse.ArgumentParser(description="Make docs/clauses.md from the code.")
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
