"""Measurements, printed as one table. Ratios stand side by side in one run; nothing passes or
fails by a time.

    python tests/benchmarks/run.py                               all of it, some three minutes
    python tests/benchmarks/run.py --quick                       fewer repeats, no large package
    python tests/benchmarks/run.py --write docs/performance.md   also write them as a page
"""

from __future__ import annotations

import argparse
import datetime
import importlib.metadata
import os
import platform
import shutil
import subprocess
import sys
import tempfile
import time
import timeit
import warnings
from dataclasses import dataclass
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
NOTEBOOKS = ROOT / "notebooks"
EXAMPLE = "schedule-to-package.ipynb"
sys.path.insert(0, str(ROOT))


@dataclass(frozen=True)
class Row:
    """A line of the table; `met` tells whether its aim was met, None where it was not measured."""

    what: str
    measured: str = ""
    aim: str = ""
    met: bool | None = None

    @property
    def verdict(self) -> str:
        if not self.aim:
            return ""
        said = {True: "met", False: "MISSED", None: "not measured"}[self.met]
        return f"{self.aim}: {said}"


def best(function, repeat: int, number: int = 5) -> float:
    """Least time of one call over many short repeats, s: what other work disturbs least."""
    return min(timeit.repeat(function, number=number, repeat=repeat)) / number


def ms(what: str, seconds: float, aim: float | None = None) -> Row:
    """A row in ms, with an aim in ms that the time is to stay below."""
    measured = f"{seconds * 1e3:.3g} ms"
    if aim is None:
        return Row(what, measured)
    return Row(what, measured, f"aim < {aim:g} ms", seconds * 1e3 < aim)


def fresh(code: str, repeat: int) -> float:
    """Least time that a statement takes as the first of a fresh interpreter, s."""
    timed = f"import time; t = time.perf_counter(); {code}; print(time.perf_counter() - t)"
    return min(
        float(subprocess.run([sys.executable, "-c", timed], cwd=ROOT, **_CAPTURED).stdout)
        for _ in range(repeat)
    )


_CAPTURED = {"check": True, "capture_output": True, "text": True}


def imports(repeat: int) -> list[Row]:
    return [
        ms("import tensionlib", fresh("import tensionlib", repeat)),
        ms(
            "import tensionlib, with Member and design",
            fresh("from tensionlib import Bolted, Gusset, Member, design", repeat),
        ),
        ms("from tensionlib.units import kN", fresh("from tensionlib.units import kN", repeat)),
    ]


def _brace():
    import tensionlib as tl

    end = tl.Bolted(
        to="long leg",
        bolts="M20 8.8/S",
        threads="in shear plane",
        per_line=3,
        pitch="70 mm",
        gauge="55 mm",
        end_distance="40 mm",
        plate=tl.Gusset("12 mm", "AS/NZS 3678 250"),
    )
    return tl.Member("RB1", "150x90x10 UA", "AS/NZS 3679.1 300", "4.6 m", end)


def one_member(repeat: int) -> list[Row]:
    import tensionlib as tl
    from tensionlib.members import book

    brace = _brace()
    force = tl.design(brace, "250 kN").value("N*")
    calc = tl.design(brace, force)
    start = time.perf_counter()
    calc.latex()
    cold = time.perf_counter() - start

    def afresh():
        book._BOOK.clear()
        tl.design(brace, force)

    def anew():
        # A calculation keeps its record; in a view of its own it makes it again.
        return calc.shown_in(tl.METRIC)

    latex = best(lambda: anew().latex(), repeat)
    steps = [line for line in calc.sheet.lines if type(line).__name__ == "Step"]
    plain = _plain_handcalcs(calc, steps)
    ratio = plain / latex
    lines, checks = len(calc.sheet.lines), len(calc.checks)
    return [
        Row(f"One bolted member: {lines} lines, {checks} checks"),
        ms("checked, its sheet known", best(lambda: tl.design(brace, force), repeat), 0.5),
        ms("checked, its sheet written anew", best(afresh, repeat)),
        ms("its LaTeX, the first of the process", cold),
        ms("its LaTeX, warm", latex, 3.0),
        ms("its record, warm, drawing included", best(lambda: anew().record(), repeat), 3.0),
        ms("its HTML, warm, record included", best(lambda: anew().html(), repeat)),
        ms("its drawing as SVG", best(calc.draw, repeat)),
        ms(f"its {len(steps)} formula lines by plain handcalcs and forallpeople", plain),
        Row(
            "that over our whole LaTeX of all its lines",
            f"{ratio:.0f} times",
            "aim >= 50 times",
            ratio >= 50.0,
        ),
    ]


def _plain_handcalcs(calc, steps) -> float:
    """The same formula lines as plain handcalcs source on forallpeople quantities."""
    import ast
    import inspect
    import textwrap

    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        import math

        from handcalcs.handcalcs import LatexRenderer

        from tensionlib.quantities import quantity

        sources, scope = [], {"sqrt": math.sqrt, "tan": math.tan, "min": min, "max": max}

        def physical(value: float, role):
            return value if role.dimensionless else quantity(value, role).si()

        for place, line in enumerate(steps):
            tree = ast.parse(textwrap.dedent(inspect.getsource(line.formula.function))).body[0]
            names = dict(
                zip(line.formula.parameters, [f"x{place}_{i}" for i in range(9)], strict=False)
            )

            class Rename(ast.NodeTransformer):
                def visit_Name(self, node, names=names):
                    plain = {"minimum": "min", "maximum": "max"}
                    return ast.Name(names.get(node.id, plain.get(node.id, node.id)))

            body = ast.unparse(Rename().visit(tree.body[-1].value))
            sources.append(f"y{place} = {body}")
            for name, arg in zip(line.formula.parameters, line.args, strict=True):
                role = calc.sheet.lines[arg].symbol.role
                scope[names[name]] = physical(calc.values[arg], role)
            for name, constant in line.formula.constants.items():
                scope[name] = physical(float(constant), constant.role)
            scope[f"y{place}"] = physical(
                calc.values[calc.sheet.lines.index(line)], line.symbol.role
            )
        config = {"override": "", "precision": 3, "sci_not": None}

        def render() -> str:
            return LatexRenderer("\n".join(sources), dict(scope), dict(config)).render()

        assert render().count(r"\mathrm{y") >= len(steps)
        return best(render, 9, number=1)


def arrays(repeat: int) -> list[Row]:
    import numpy as np

    import tensionlib as tl

    calc = tl.design(_brace(), "250 kN")
    n = 100_000
    rng = np.random.default_rng(1)
    inputs = {
        key: np.asarray(value) * rng.uniform(0.99, 1.01, n)
        if "s_p" in key or "N_" in key
        else value
        for key, value in calc.inputs().items()
    }
    one = best(lambda: calc.sheet.evaluate(calc.inputs()), repeat)
    many = best(lambda: calc.sheet.fill(inputs).utilisations(), repeat, number=1)
    return [
        Row("The same sheet as numbers alone"),
        Row("filled with one row", f"{1 / one:,.0f} rows/s"),
        Row(f"filled with {n:,} rows", f"{n / many:,.0f} rows/s"),
        Row("the second over the first", f"{n / many * one:.0f} times"),
    ]


def _holes(count: int):
    """A pattern of `count` holes in six staggered lines, none with a bolt missing."""
    from tensionlib.joints.parts import Opening

    return [
        Opening.round(str(i), 40.0 + 70.0 * (i // 6) + 35.0 * (i % 2), 40.0 + 60.0 * (i % 6), 22.0)
        for i in range(count)
    ]


def searches(repeat: int) -> list[Row]:
    """Net-section chains and tear-out blocks: against size, and against trying every one."""
    from tensionlib.joints.blocks import Form, least_block
    from tensionlib.joints.parts import Flat
    from tensionlib.joints.paths import least_path
    from tests.brute import area_lost, chains, least_surface

    part = Flat.plain(400.0, 12.0)
    forms = (Form(0.0, 264.0, 0.0, 440.0), Form(192.0, 0.0, 0.0, 440.0))
    few = max(repeat // 4, 1)
    rows = [Row("Search of a pattern in six staggered lines")]
    for count in (12, 48, 96, 200, 400):
        holes = _holes(count)
        took = best(lambda h=holes: least_path(part, h), few, 3)
        rows.append(ms(f"least chain of {count} holes", took, 10.0 if count == 200 else None))
    for count in (12, 48):
        holes = _holes(count)
        took = best(lambda h=holes: least_path(part, h, credit_behind=True, gross=1e5), few, 1)
        rows.append(ms(f"the same of {count} holes, bolts behind credited", took))
    for count in (8, 12):
        holes = _holes(count)
        took = best(lambda h=holes: least_path(part, h), few, 3)
        tried = best(lambda h=holes: max(area_lost(part, c) for c in chains(h)), few, 1)
        rows.append(
            Row(f"every chain of {count} holes tried, over the search", _times(tried / took))
        )
    for count in (4, 12, 24, 48):
        holes = _holes(count)
        took = best(lambda h=holes: least_block(part, h, forms), few, 1)
        rows.append(ms(f"least block of {count} bolts, member and forms of AS 4100", took))
    for count in (4, 6):
        holes = _holes(count)
        took = best(lambda h=holes: least_block(part, h, forms), few, 1)
        tried = best(lambda h=holes: least_surface(part, h, forms, whole=False, edges=True), 1, 1)
        rows.append(
            Row(f"every surface of {count} bolts tried, over the search", _times(tried / took))
        )
    return rows


def _times(ratio: float) -> str:
    return f"{ratio:.3g} times"


def packages(quick: bool) -> list[Row]:
    """Notebooks issued from the command line, start of the interpreter and kernel included."""
    if not (NOTEBOOKS / EXAMPLE).exists():
        print(f"packages: skipped, notebooks/{EXAMPLE} is not there", file=sys.stderr)
        return [Row("package of the example", "skipped", "aim < 8 s")]
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        for file in NOTEBOOKS.iterdir():
            if file.suffix in (".ipynb", ".toml", ".csv"):
                shutil.copy(file, folder)
        schedule = folder / "canopy-members.csv"
        head, *members = schedule.read_text(encoding="utf-8").splitlines()
        beside = (folder / "canopy.toml").read_text(encoding="utf-8").count("[[members]]")
        rows = [_issue(folder, len(members) + beside, 8.0)]
        if quick:
            return rows
        times = -(-100 // len(members))
        many = [
            line.replace(",", f"-{i // len(members)},", 1) for i, line in enumerate(members * times)
        ][: 100 - beside]
        schedule.write_text("\n".join([head, *many]) + "\n", encoding="utf-8")
        return [*rows, _issue(folder, 100, 30.0)]


def _issue(folder: Path, members: int, aim: float) -> Row:
    what = f"package of {members} members, from the command line"
    command = [sys.executable, "-m", "tensionlib.package.cli", "issue", EXAMPLE, "--quiet"]
    environment = os.environ | {"PYTHONPATH": str(ROOT)}
    start = time.perf_counter()
    try:
        subprocess.run(command, cwd=folder, env=environment, **_CAPTURED)
    except subprocess.CalledProcessError as failed:
        print(f"{what}: not written\n{failed.stderr}", file=sys.stderr)
        return Row(what, "not written", f"aim < {aim:g} s")
    taken = time.perf_counter() - start
    return Row(what, f"{taken:.1f} s", f"aim < {aim:g} s", taken < aim)


def machine() -> str:
    """The machine in a line."""
    model = platform.processor() or platform.machine()
    info = Path("/proc/cpuinfo")
    if info.exists():
        names = [x for x in info.read_text().splitlines() if x.startswith("model name")]
        model = names[0].partition(": ")[2] if names else model
    packages = ", ".join(
        f"{name} {importlib.metadata.version(name)}"
        for name in ("handcalcs", "forallpeople", "numpy", "nbconvert", "typst")
    )
    load = f", load {os.getloadavg()[0]:.1f}" if hasattr(os, "getloadavg") else ""
    return (
        f"{os.cpu_count()} cores of {model}, {platform.system()}{load},"
        f" Python {platform.python_version()}, {packages}"
    )


def table(rows: list[Row]) -> str:
    width = max(len(row.what) for row in rows)
    return "\n".join(
        f"{row.what:<{width}}  {row.measured:>14}  {row.verdict}".rstrip() for row in rows
    )


def page(rows: list[Row], where: str) -> str:
    body = "\n".join(f"| {row.what} | {row.measured} | {row.verdict} |" for row in rows)
    met, missed, open_ = (
        [row.what for row in rows if row.aim and row.met is met] for met in (True, False, None)
    )
    said = f"{len(met)} aims met, {len(missed)} missed."
    if missed:
        said += "\nMissed: " + "; ".join(missed) + "."
    if open_:
        said += "\nNot measured: " + "; ".join(open_) + "."
    return f"""# Performance

Made by `python tests/benchmarks/run.py --write docs/performance.md` on
{datetime.date.today().isoformat()}, on {where}.

The least of several repeats is given, except for packages and the first LaTeX, which run once.
Times vary by about a fifth from run to run and more on a machine with other work; the ratios are
of times taken in the same run. The aims are the project's own, and no test fails by a time.

{said}

| What | Measured | Aim |
|---|---:|---|
{body}

- A member whose choices have been met before fills a written sheet again (`members/book.py`); a new
  case is walked once.
- Pictures of formulas are built through handcalcs at the first show, and filled as text afterwards.
- Plain handcalcs is its public renderer on the same formulas with the same numbers as forallpeople
  quantities: {_FORMULAS_ONLY}.
- A package is executed in a kernel of its own; most of its time for few members is the start of
  interpreter, kernel and typesetter.
- Packages are timed in the environment this ran in. One that holds JupyterLab too takes some two
  seconds more to import nbformat, whose validator then builds a large grammar.
"""


_FORMULAS_ONLY = "the formula lines alone, against all lines, clauses and the drawing of ours"


def main() -> None:
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--quick", action="store_true", help="fewer repeats, no large package")
    parser.add_argument("--write", metavar="FILE", help="also write the table as a page")
    args = parser.parse_args()
    repeat = 20 if args.quick else 200
    # Before the measuring itself loads it.
    where = machine()
    rows = [
        *imports(5 if args.quick else 15),
        *one_member(repeat),
        *arrays(repeat),
        *searches(repeat),
        *packages(args.quick),
    ]
    print(f"{where}\n\n{table(rows)}")
    if args.write:
        Path(args.write).write_text(page(rows, where), encoding="utf-8")


if __name__ == "__main__":
    main()
