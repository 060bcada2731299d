"""docs/clauses.md lists every formula of the code, and says what is not checked from outside."""

from __future__ import annotations

import re

from tests.clauses import PAGE, PUBLISHED, found, page

TEXT = PAGE.read_text(encoding="utf-8")


def _listed() -> dict[str, set[str]]:
    """Published tests by formula, read back from the page's own rows."""
    files = re.compile(r"\.\./tests/published/(test_\w+\.py)")
    rows = [line for line in TEXT.splitlines() if line.startswith("| ")]
    by: dict[str, set[str]] = {}
    names = iter(found())
    # Rows stand by group; the page made with what they say must be the page itself.
    told: dict[str, list[set[str]]] = {}
    for row in rows:
        told.setdefault(row.split(" | ")[0], []).append(set(files.findall(row)))
    for name, thing in names:
        from tests.clauses import _cell, _equation

        left = told.get(f"| {_cell(_equation(thing))}")
        if left:
            by[name] = left.pop(0)
    return by


def test_the_page_is_the_one_the_code_gives():
    """All of it but which published tests run, which a change of the tests may change."""
    assert page(found(), _listed()) == TEXT, "run python -m tests.clauses"


def test_every_published_test_named_is_there():
    for file in re.findall(r"\.\./tests/published/(\S+?)\)", TEXT):
        assert (PUBLISHED / file).is_file()


def test_what_has_no_outside_check_is_listed_whole():
    unchecked = TEXT.partition("## Without an outside check")[2]
    rows = TEXT.partition("## Tabulated values")[0]
    assert rows.count("no outside check |") == unchecked.count("\n- `")
    assert len(found()) > 120
