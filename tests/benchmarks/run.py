"""Measurements, printed as one table. Ratios stand side by side in one run; nothing passes or
fails by a time.

    python tests/benchmarks/run.py            all of it
    python tests/benchmarks/run.py --quick    fewer repeats, no package of 100 members
    python tests/benchmarks/run.py --write    also write docs/performance.md
"""

from __future__ import annotations

import argparse
import datetime
import importlib.metadata
import json
import os
import platform
import shutil
import subprocess
import sys
import tempfile
import time
import timeit
import warnings
from pathlib import Path

ROOT = Path(__file__).resolve().parents[2]
NOTEBOOKS = ROOT / "notebooks"
EXAMPLE = "schedule-to-package.ipynb"

Row = tuple[str, str, str]


def best(function, number: int, repeat: int) -> float:
    """Least time of one call over the repeats, s."""
    return min(timeit.repeat(function, number=number, repeat=repeat)) / number


def ms(seconds: float) -> str:
    return f"{seconds * 1e3:.3g} ms"


def command(*words: str, cwd: Path = ROOT) -> float:
    """Seconds that a command takes from its start to its end."""
    start = time.perf_counter()
    subprocess.run(words, cwd=cwd, check=True, stdout=subprocess.DEVNULL)
    return time.perf_counter() - start


def imports() -> list[Row]:
    empty = min(command(sys.executable, "-c", "pass") for _ in range(5))
    library = min(command(sys.executable, "-c", "import tensionlib") for _ in range(5))
    units = min(command(sys.executable, "-c", "from tensionlib.units import kN") for _ in range(5))
    return [
        ("import tensionlib, over an empty interpreter", ms(library - empty), ""),
        ("from tensionlib.units import kN, likewise", ms(units - empty), ""),
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
    return tl.Member("RB1", "125x75x10 UA", "AS/NZS 3679.1 300", "4.6 m", end)


def one_member(repeat: int) -> list[Row]:
    import tensionlib as tl
    from tensionlib.members import book

    brace = _brace()
    force = tl.design(brace, "250 kN").value("N*")
    start = time.perf_counter()
    calc = tl.design(brace, force)
    lines = calc.latex()
    cold = time.perf_counter() - start
    assert lines

    def afresh():
        book._BOOK.clear()
        tl.design(brace, force)

    design = best(lambda: tl.design(brace, force), 50, repeat)
    walked = best(afresh, 50, repeat)
    latex = best(lambda: calc.shown_in(tl.METRIC).latex(), 20, repeat)
    html = best(lambda: calc.shown_in(tl.METRIC).html(), 20, repeat)
    sketch = best(calc.draw, 50, repeat)
    steps = [line for line in calc.sheet.lines if type(line).__name__ == "Step"]
    rows = [
        (f"one bolted member, {len(calc.sheet.lines)} lines, {len(calc.checks)} checks", "", ""),
        ("checked, its sheet known", ms(design), "aim 0.5 ms"),
        ("checked, its sheet written anew", ms(walked), ""),
        ("LaTeX of it, first of the process", ms(cold), ""),
        ("LaTeX of it, warm", ms(latex), "aim 3 ms"),
        ("HTML of it, warm, sketch included", ms(html), ""),
        ("sketch as SVG", ms(sketch), ""),
    ]
    plain = _plain_handcalcs(calc, steps)
    ours = latex
    return [
        *rows,
        (f"its {len(steps)} formula lines by plain handcalcs and forallpeople", ms(plain), ""),
        ("plain handcalcs over our whole LaTeX", f"{plain / ours:.0f} times", "aim 50 times"),
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

        def render():
            LatexRenderer("\n".join(sources), dict(scope), dict(config)).render()

        render()
        return best(render, 1, 3)


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
    one = best(lambda: calc.sheet.evaluate(calc.inputs()), 50, repeat)
    many = best(lambda: calc.sheet.fill(inputs).utilisations(), 1, repeat)
    return [
        ("the same sheet filled with one row", ms(one), f"{1 / one:,.0f} rows a second"),
        (f"filled with {n:,} rows", ms(many), f"{n / many:,.0f} rows a second"),
    ]


def _issue(folder: Path, notebook: str) -> float:
    return command(
        sys.executable, "-m", "tensionlib.package.cli", "issue", notebook, "--quiet", cwd=folder
    )


def packages(quick: bool) -> list[Row]:
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        for file in NOTEBOOKS.iterdir():
            if file.suffix in (".ipynb", ".toml", ".csv"):
                shutil.copy(file, folder)
        count = len((folder / "canopy-members.csv").read_text().splitlines()) + 1
        rows = [
            (
                f"package of the example, {count} members, from the command line",
                f"{_issue(folder, EXAMPLE):.1f} s",
                "aim 8 s",
            )
        ]
        if quick:
            return rows
        schedule = folder / "canopy-members.csv"
        head, *members = schedule.read_text(encoding="utf-8").splitlines()
        many = [
            line.replace(",", f"-{i // len(members)},", 1) for i, line in enumerate(members * 7)
        ][:98]
        schedule.write_text("\n".join([head, *many]) + "\n", encoding="utf-8")
        rows.append(("package of 100 members", f"{_issue(folder, EXAMPLE):.1f} s", "aim 30 s"))
        return rows


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
    return (
        f"{os.cpu_count()} cores of {model}; {platform.system()};"
        f" Python {platform.python_version()}; {packages}"
    )


def table(rows: list[Row]) -> str:
    width = max(len(row[0]) for row in rows)
    return "\n".join(f"{a:<{width}}  {b:>10}  {c}".rstrip() for a, b, c in rows)


def page(rows: list[Row]) -> str:
    body = "\n".join(f"| {a} | {b} | {c} |" for a, b, c in rows)
    return f"""# Performance

Made by `python tests/benchmarks/run.py --write` on {datetime.date.today().isoformat()}:
{machine()}. Times vary by about a fifth from run to run and more on a loaded machine; the ratio
stands side by side in one run. Aims are the project's own.

| What | Measured | |
|---|---|---|
{body}

A member whose choices have been met before fills a written sheet again (`members/book.py`); a new
case is walked once. Pictures of formulas are built on first show and filled as text afterwards.
"""


def main() -> None:
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--quick", action="store_true", help="fewer repeats, no large package")
    parser.add_argument("--write", action="store_true", help="write docs/performance.md")
    parser.add_argument("--json", action="store_true", help="print as JSON")
    args = parser.parse_args()
    repeat = 3 if args.quick else 7
    rows = [*imports(), *one_member(repeat), *arrays(repeat), *packages(args.quick)]
    print(json.dumps(rows) if args.json else f"{machine()}\n\n{table(rows)}")
    if args.write:
        (ROOT / "docs" / "performance.md").write_text(page(rows), encoding="utf-8")


if __name__ == "__main__":
    main()
