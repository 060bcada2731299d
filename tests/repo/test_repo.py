"""Rules of the repository: light import, names, folders, words, links, a further standard."""

from __future__ import annotations

import re
import subprocess
import sys
from importlib import import_module
from importlib.metadata import EntryPoint
from pathlib import Path

import pytest

import tensionlib as tl
from tensionlib import standards
from tensionlib.errors import DataNotFoundError
from tests.builders import member

ROOT = Path(__file__).resolve().parents[2]
HEAVY = (
    "sympy",
    "handcalcs",
    "pandas",
    "ipywidgets",
    "nbconvert",
    "ezdxf",
    "matplotlib",
    "pydantic",
)


@pytest.fixture(scope="module")
def tracked() -> list[str]:
    """Paths git tracks; skipped where the tests run outside a clone."""
    if not (ROOT / ".git").exists():
        pytest.skip("no git clone: the rules on tracked files cannot be read")
    listed = subprocess.run(
        ["git", "ls-files", "-z"], cwd=ROOT, capture_output=True, text=True, check=True
    )
    return [path for path in listed.stdout.split("\0") if path and (ROOT / path).exists()]


def _loaded_after(code: str) -> set[str]:
    """Which of the heavy packages a fresh interpreter has loaded after running `code`."""
    script = f"import sys\n{code}\nprint(*[n for n in {HEAVY!r} if n in sys.modules])"
    done = subprocess.run(
        [sys.executable, "-c", script], cwd=ROOT, capture_output=True, text=True, check=True
    )
    return set(done.stdout.split())


def test_import_is_light():
    assert _loaded_after("import tensionlib") == set()


def test_the_heavy_packages_would_be_seen():
    assert _loaded_after("import pydantic, sympy") == {"pydantic", "sympy"}


def test_a_design_is_light_until_it_is_shown():
    """A calculation with its checks needs no picture; showing it does."""
    code = (
        "import tensionlib as tl\n"
        "end = tl.Bolted('leg', 'M20 8.8/S', 'in shear plane', 2,"
        " tl.Gusset('10 mm', 'AS/NZS 3678 250'), '40 mm', pitch='70 mm', gauge='55 mm')\n"
        "m = tl.Member('T1', '100x100x8 EA', 'AS/NZS 3679.1 300', '3 m', end)\n"
        "assert tl.design(m, '90 kN').governing.utilisation > 0"
    )
    assert _loaded_after(code) == set()


def test_every_public_name_resolves():
    assert {"design", "Member", "Bolted", "Welded", "Gusset", "section"} <= set(tl.__all__)
    for name in tl.__all__:
        assert getattr(tl, name) is not None
    assert dir(tl) == sorted(tl.__all__)
    with pytest.raises(AttributeError, match="no attribute 'desing'"):
        _ = tl.desing


def test_names_for_editors_are_the_names_there_are():
    """The names listed for type checkers and those loaded on demand are the same."""
    source = (ROOT / "tensionlib" / "__init__.py").read_text(encoding="utf-8")
    named = re.findall(r"from (tensionlib\.[\w.]+) import (\w+) as \2", source)
    assert {name for _, name in named} == set(tl.__all__) - {"__version__"}
    for module, name in named:
        assert getattr(import_module(module), name) is getattr(tl, name)


def test_top_level_is_fixed(tracked):
    top = {path.split("/")[0] for path in tracked}
    assert {name for name in top if not name.startswith(".")} == {
        "README.md",
        "DEVELOPERS.md",
        "pyproject.toml",
        "tensionlib",
        "notebooks",
        "tests",
        "docs",
    }


# Written in two halves, so that this file does not hold the words itself.
WORDS = [re.compile(rf"\b{a}{b}\b") for a, b in (("TO", "DO"), ("FIX", "ME"), ("X", "XX"))]
PATHS = [
    re.compile(rf"(?<![\w.:/])/{folder}/\w") for folder in ("work", "tmp", "root", "Users", "mnt")
] + [re.compile(r"(?<![\w.:/])/home/\w+/"), re.compile(r"\b[A-Z]:\\\\?Users")]


def _text(path: str) -> str | None:
    try:
        return (ROOT / path).read_text(encoding="utf-8")
    except UnicodeDecodeError:
        return None


def test_no_leftover_words_or_machine_paths(tracked):
    found = []
    for path in tracked:
        if path.split("/")[0] not in ("tensionlib", "tests", "docs"):
            continue
        for number, line in enumerate((_text(path) or "").splitlines(), 1):
            if any(pattern.search(line) for pattern in (*WORDS, *PATHS)):
                found.append(f"{path}:{number}: {line.strip()[:80]}")
    assert found == []


@pytest.mark.parametrize(
    ("line", "caught"),
    [
        ("# TO" + "DO: later", True),
        ("see /" + "tmp/x.py", True),
        ("open('/" + "home/me/job.toml')", True),
        ("xl/worksheets/sheet1.xml", False),
        ("https://example.org/" + "work/x", False),
    ],
)
def test_the_patterns_catch_what_they_are_for(line, caught):
    assert any(pattern.search(line) for pattern in (*WORDS, *PATHS)) == caught


@pytest.mark.parametrize("page", ["README.md", "DEVELOPERS.md"])
def test_links_and_paths_lead_somewhere(page):
    """Markdown links to files of the repository, and the paths named in code type."""
    text = (ROOT / page).read_text(encoding="utf-8")
    links = [link.split("#")[0] for link in re.findall(r"\]\(([^)\s]+)\)", text)]
    named = re.findall(r"`((?:tensionlib|tests|docs|notebooks)/[\w./*-]*)`", text)
    wanted = {path for path in [*links, *named] if path and "://" not in path}
    assert wanted
    assert [path for path in sorted(wanted) if not list(ROOT.glob(path.rstrip("/")))] == []


# A standard from elsewhere ------------------------------------------------------------------

TOY = '''
"""A standard that knows gross yielding alone."""

import tensionlib as tl
from tensionlib.quantities import AREA, FORCE, LENGTH, STRESS
from tensionlib.standards import Standard

SOURCE = tl.Source("Toy rules, first edition", "Toy", "made for a test")
NOTATION = tl.Notation(
    SOURCE,
    [
        tl.Symbol("N_star", "N^{*}", FORCE, "design force", "N*"),
        tl.Symbol("A_g", "A_{g}", AREA, "gross area"),
        tl.Symbol("t_y", "t_{y}", LENGTH, "thickness"),
        tl.Symbol("f_y", "f_{y}", STRESS, "yield stress"),
        tl.Symbol("N_y", "N_{y}", FORCE, "capacity"),
    ],
)


@tl.formula("N_y", NOTATION, title="yielding", clause="1")
def yielding(A_g, f_y):
    """Capacity in yielding [force]."""
    return 0.5 * A_g * f_y


def walk(work, member, ends, force):
    with work.part("Member"):
        A_g = member.take(work, "A_g")
        f_y = member.read(work, "f_y", member.take(work, "t_y"))
        work.check("yield", force, work.step(yielding, A_g, f_y), "1")


STANDARD = Standard("toyrules", NOTATION, walk, lambda d_f, kind: (d_f + 1.0, d_f + 1.0))
'''


@pytest.fixture
def toy(tmp_path, monkeypatch):
    """The toy standard as a package of its own, offered through an entry point."""
    folder = tmp_path / "toyrules_elsewhere"
    folder.mkdir()
    (folder / "__init__.py").write_text(TOY, encoding="utf-8")
    monkeypatch.syspath_prepend(tmp_path)
    point = EntryPoint("toyrules", "toyrules_elsewhere:STANDARD", standards.GROUP)
    monkeypatch.setattr(standards, "entry_points", lambda *, group: (point,))
    standards.standard.cache_clear()
    yield
    standards.standard.cache_clear()
    sys.modules.pop("toyrules_elsewhere", None)


@pytest.mark.usefixtures("toy")
def test_a_standard_from_outside_the_package_designs_a_member():
    assert standards.names() == ("as4100", "nzs3404", "toyrules")
    calc = tl.design(member(), "100 kN", standard="Toy Rules")
    check = calc["yield"]
    assert check.capacity.internal == pytest.approx(0.5 * tl.section("150x90x10 UA").A * 320)
    assert calc.word == "PASS"
    assert "Toy rules, first edition" in calc.text()
    assert "0.5·A_g·f_y" in calc.text()
    assert tl.design(member(), "100 kN").heading.standard_key == "nzs3404"


def test_it_is_gone_when_it_is_not_installed():
    with pytest.raises(DataNotFoundError, match="'Toy Rules' is not on offer"):
        tl.design(member(), "100 kN", standard="Toy Rules")
