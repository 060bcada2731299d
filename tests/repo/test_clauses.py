"""docs/clauses.md lists every formula of the code, and says what is not checked from outside."""

from __future__ import annotations

import inspect
import re
from importlib import import_module

import pytest

from tests import clauses

TEXT = clauses.PAGE.read_text(encoding="utf-8")
# A formula's row, by the name in its first cell.
ROWS = dict(re.findall(r"^\| `([\w.]+)` (\| `.*\|)$", TEXT, re.MULTILINE))


def test_the_page_is_the_one_the_code_gives():
    """All of it but which published tests run, which is taken from the page's own rows."""
    by = {name: set(re.findall(r"\(\.\./tests/published/(\w+\.py)\)", ROWS[name])) for name in ROWS}
    assert clauses.page(clauses.found(), by) == TEXT, "run python -m tests.clauses"


def test_every_formula_has_its_row():
    assert set(ROWS) == {name for name, _ in clauses.found()}
    assert len(ROWS) > 100


def test_every_link_leads_to_a_file():
    links = set(re.findall(r"\]\(([^)]+)\)", TEXT))
    assert links
    assert [link for link in sorted(links) if not (clauses.PAGE.parent / link).is_file()] == []


def test_what_has_no_outside_check_is_listed_and_counted():
    listed = re.findall(r"^- `([\w.]+)`$", TEXT, re.MULTILINE)
    assert listed == sorted(name for name, row in ROWS.items() if clauses.UNCHECKED in row)
    told = re.search(r"\*\*(\d+) of (\d+) formulas .*\nfigures; (\d+) have no", TEXT)
    assert told
    assert [int(n) for n in told.groups()] == [len(ROWS) - len(listed), len(ROWS), len(listed)]


def test_every_fixed_value_is_told_of():
    """A new constant of a standard is to be described in tests/clauses.py."""
    names = {name for name, _ in clauses.constants()}
    assert set(clauses.TOLD) - names == set()
    assert "not told" not in TEXT


@pytest.mark.parametrize("name", sorted(clauses.TOLD))
def test_the_clause_told_stands_in_the_module(name):
    module = import_module(clauses.PACKAGE + name.rpartition(".")[0])
    assert clauses.TOLD[name][1] in inspect.getsource(module)


def test_a_clause_stands_in_the_column_of_its_standard():
    assert clauses.clauses("common_as_nzs.x", "9.3.2.1") == "9.3.2.1 | 9.3.2.1 | 9.2.2.1"
    assert clauses.clauses("as4100.x", "9.3.2.4") == "– | 9.3.2.4 | 9.2.2.4"
    assert clauses.clauses("nzs3404.x", "section 12") == "section 12 | – | –"
    assert clauses.clauses("common_as_nzs.x", "9.1.9") == "practice | 9.1.9 | 9.1.9"
    assert clauses.clauses("common_as_nzs.x", "") == "none | none | none"
