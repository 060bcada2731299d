"""What a calculation says as text, LaTeX, HTML and plain data."""

from __future__ import annotations

import json
import math
import re
from html.parser import HTMLParser

import pytest

import tensionlib as tl
from tensionlib.calculation.readings import html as html_reading
from tensionlib.calculation.result import Calculation, Heading
from tensionlib.calculation.working import Working
from tensionlib.quantities import FORCE, METRIC, US
from tests.builders import bolted, gusset, member, two_lines, welded

HOSTILE = "<script>alert(1)</script> $x$ \\(y\\) & `z` \"q\" 'a' #b _c_ </pre>"
TYPESET = re.compile(r"\$[^$]+\$|\\\(.+?\\\)|\\\[.+?\\\]")
VOID = {"wbr", "br", "path", "circle", "line", "polyline", "polygon", "rect", "mspace"}


def _two_ended() -> tl.Member:
    return member(far_end=welded(length_2="90 mm"), mark="RB5")


CASES = {
    "bolted": lambda: tl.design(member(), "250 kN"),
    "failing": lambda: tl.design(member(), "900 kN"),
    "no demand": lambda: tl.design(member(), "0 kN"),
    "two ends": lambda: tl.design(_two_ended(), "200 kN"),
    "staggered": lambda: tl.design(
        member(
            "150x100x10 UA",
            bolted(
                lines=2,
                per_line=2,
                pitch="80 mm",
                gauge="50 mm",
                line_spacing="60 mm",
                stagger="40 mm",
                plate=gusset(width="260 mm"),
            ),
        ),
        "300 kN",
    ),
    "web": lambda: tl.design(member("200 PFC", two_lines(to="web")), "250 kN"),
    "US": lambda: tl.design(member(), "250 kN", view=US),
}


@pytest.fixture(params=CASES, scope="module")
def calc(request) -> Calculation:
    return CASES[request.param]()


class _Page(HTMLParser):
    """The text of a page where it may be typeset and where not, its tags, and its balance."""

    def __init__(self, html: str) -> None:
        super().__init__()
        self.open: list[tuple[str, dict[str, str | None]]] = []
        self.tags: list[str] = []
        self.typeset, self.literal, self.plain_copy = [], [], []
        self.feed(html)
        self.close()
        assert self.open == []

    def handle_starttag(self, tag, attrs):
        self.tags.append(tag)
        if tag not in VOID:
            self.open.append((tag, dict(attrs)))

    def handle_startendtag(self, tag, attrs):
        self.tags.append(tag)

    def handle_endtag(self, tag):
        assert self.open.pop()[0] == tag

    def handle_data(self, data):
        inside = [tag for tag, _ in self.open]
        classes = " ".join(attrs.get("class") or "" for _, attrs in self.open).split()
        if "style" in inside:
            return
        if "tl-text" in classes:
            self.plain_copy.append(data)
        elif "mathjax_ignore" in classes and "tex2jax_ignore" in classes:
            self.literal.append(data)
        else:
            self.typeset.append(data)


def _without_drawing(html: str) -> str:
    return re.sub(r"<svg.*?</svg>", "", html, flags=re.DOTALL)


# The same in every reading ------------------------------------------------------------------


def test_every_check_stands_in_every_reading_with_the_same_numbers(calc):
    text, latex = calc.text(), calc.latex()
    page = _Page(calc.html())
    cells = " | ".join(page.literal)
    assert calc.checks
    for check in calc.record()["checks"]:
        row = " +".join(re.escape(check[key]) for key in ("part", "name", "clause"))
        numbers = [check["demand_text"], check["capacity_text"], check["utilisation_text"]]
        found = re.search(row + " +" + " +".join(map(re.escape, numbers)), text)
        assert found, (row, numbers)
        note = [check["note"]] if check["note"] else []
        shown = [check["part"], check["name"], *note, check["clause"], *numbers, check["verdict"]]
        assert " | ".join(shown) in cells
        assert rf"\text{{{check['clause']}}}" in latex


def test_every_line_stands_in_every_reading(calc):
    text, latex, html = calc.text(), calc.latex(), calc.html()
    lines = [line for part in calc.record()["parts"] for line in part["lines"]]
    assert len(lines) > 40
    for line in lines:
        assert line["text"] in text
        for step in line["steps"]:
            assert step in latex
        if line["latex"]:
            number = re.match(r"\d[\d.]*", line["steps"][-1])
            assert number
            assert f"<mn>{number[0]}</mn>" in html


def test_every_given_number_is_printed_with_its_origin(calc):
    text = calc.text()
    cells = _Page(calc.html()).literal
    for entry in calc.record()["inputs"]:
        pattern = " +".join(map(re.escape, (entry["symbol"], entry["text"], entry["meaning"])))
        assert re.search(pattern + " +" + re.escape(entry["origin"]), text)
        assert entry["meaning"] in cells
        assert entry["origin"] in cells


def test_readings_are_the_same_each_time(calc):
    # A view of its own, so that nothing kept from the first reading is handed out again.
    again = calc.shown_in(calc.view)
    assert again is not calc
    assert again.html() == calc.html()
    assert again.latex() == calc.latex()
    assert again.text() == calc.text()
    assert again.record() == calc.record()


def test_verdict_is_in_words():
    passing, failing = CASES["bolted"](), CASES["failing"]()
    assert passing.word == "PASS"
    assert failing.word == "FAIL"
    for reading in (failing.text(), "".join(_Page(failing.html()).literal), repr(failing)):
        assert "FAIL, by bolt shear (9.3.2.1), utilisation" in reading
    assert "<strong><span" in failing.html()
    assert re.search(r"<strong><span[^>]*>fail</span></strong>", failing.html())
    assert not re.search(r"<strong><span[^>]*>fail</span></strong>", passing.html())


def test_a_check_that_fails_is_written_with_its_own_sign():
    failing = CASES["failing"]().record()
    line = next(
        line
        for part in failing["parts"]
        for line in part["lines"]
        if line["kind"] == "check" and line["title"] == "bolt shear"
    )
    assert line["verdict"] == "fail"
    assert [">" in step and r"\leq" not in step for step in line["steps"]] == [True, True]
    assert " > " in line["text"]


# Text of the user's -------------------------------------------------------------------------


@pytest.fixture(scope="module")
def hostile() -> Calculation:
    return tl.design(member(mark=HOSTILE, title=HOSTILE), "250 kN", origin=HOSTILE)


def test_users_text_stays_literal_in_html(hostile):
    page = _Page(hostile.html())
    assert "script" not in page.tags
    assert f"{HOSTILE}, {HOSTILE}" in page.literal
    assert HOSTILE in page.literal
    assert HOSTILE in "".join(page.plain_copy)
    assert not [text for text in page.typeset if TYPESET.search(text)]
    assert "alert" not in "".join(page.typeset)


def test_the_test_of_literal_text_sees_what_it_looks_for():
    page = _Page('<p>$x$</p><p class="mathjax_ignore tex2jax_ignore">$y$</p>')
    assert [text for text in page.typeset if TYPESET.search(text)] == ["$x$"]
    assert page.literal == ["$y$"]


def test_users_text_leaves_the_drawing_well_formed(hostile):
    from xml.etree import ElementTree

    for sketch in hostile.record()["sketches"]:
        ElementTree.fromstring(sketch["svg"])
        assert "<script" not in sketch["svg"]


def test_users_text_does_not_reach_latex_as_commands():
    notation = tl.project_notation(tl.Symbol("N", "N", FORCE, "force"))
    work = Working("part & $x$", notation)
    work.given("N", "1 kN")
    entry = work.given("N", "2 kN", key="other")
    work.check("50 % & $x$", entry, entry, r"a_b \input{x} #1")
    calc = Calculation.of(work, Heading("P1", "", ""))
    assert r"\text{a\_b \textbackslash{}input\{x\} \#1}" in calc.latex()
    assert "$x$" not in calc.latex()


# HTML ---------------------------------------------------------------------------------------


def test_html_is_well_formed_and_asks_for_nothing(calc):
    page = _Page(calc.html())
    assert not {"script", "link", "iframe", "object", "img"} & set(page.tags)
    addresses = set(re.findall(r"https?://[^\s\"'<)]+", calc.html()))
    assert addresses == {"http://www.w3.org/2000/svg"}
    assert "url(" not in html_reading.style()


def test_the_plain_copy_stands_inside_the_html(calc):
    assert "".join(_Page(calc.html()).plain_copy).strip() == calc.text().strip()


def test_every_css_variable_used_is_defined():
    css = html_reading.style()
    used = set(re.findall(r"var\((--tl-[a-z]+)", css))
    assert used
    assert used == set(re.findall(r"(--tl-[a-z]+):", css))
    # The page's own colours each have one to fall back on.
    assert re.findall(r"var\(--(?!tl-)[^,)]*\)", css) == []


def test_every_class_written_has_a_rule_or_is_a_name_for_readers(calc):
    written = set(re.findall(r'class="([^"]*)"', _without_drawing(calc.html())))
    classes = {name for value in written for name in value.split() if name.startswith("tl-")}
    ruled = set(re.findall(r"\.(tl-[a-z]+)", html_reading.style()))
    assert classes - ruled == {"tl-words", "tl-inputs", "tl-checks"} & classes


def test_every_part_folds_and_the_checks_stand_open(calc):
    found = re.findall(r"<details( open)?><summary><span[^>]*>([^<]*)", calc.html())
    parts = [part["title"] for part in calc.record()["parts"]]
    titles = [title for _, title in found]
    assert titles[: len(parts) + 2] == ["Inputs", *parts, "Checks"]
    assert [title for is_open, title in found if is_open] == ["Checks"]


def test_a_long_sum_may_go_on_to_the_next_line():
    assert html_reading._terms(r"= a + \frac{b - c}{2} - \left( d + e \right)") == [
        "= a",
        r"+ \frac{b - c}{2}",
        r"- \left( d + e \right)",
    ]
    assert html_reading._terms(r"= \min\left(a + b,\ c\right)") == [r"= \min\left(a + b,\ c\right)"]


# Plain data ---------------------------------------------------------------------------------

KEYS = {
    "": "format version kind mark title subject standard headline force verdict inputs parts checks"
    " assumptions not_checked notation sources sketches values provenance",
    "standard": "name short key",
    "verdict": "passes word governing",
    "inputs": "part symbol latex meaning text latex_value origin value unit",
    "parts": "title lines",
    "checks": "part name clause kind demand capacity unit demand_text capacity_text utilisation"
    " utilisation_text verdict note",
    "notation": "symbol latex meaning unit",
    "sources": "name use known",
    "sketches": "title svg alt",
    "provenance": "version inputs_hash",
}
LINE_KEYS = set(["kind", "title", "symbol", "latex", "steps", "text", "clause", "note"])


def test_record_has_the_keys_that_files_rely_on(calc):
    record = calc.record()
    for key, names in KEYS.items():
        rows = record if not key else record[key]
        for row in rows if isinstance(rows, list) else [rows]:
            assert set(row) == set(names.split()), key
    for part in record["parts"]:
        for line in part["lines"]:
            assert set(line) >= LINE_KEYS
    assert {entry["symbol"] for entry in record["inputs"]} <= {
        n["symbol"] for n in record["notation"]
    }
    assert record["values"]["A_g"]["unit"] == calc.view.unit(calc.value("A_g").role).ascii


def test_record_is_json_and_comes_back_the_same(calc):
    record = calc.record()
    assert json.loads(json.dumps(record, allow_nan=False)) == record


def test_record_has_null_where_a_number_is_missing():
    notation = tl.project_notation(
        tl.Symbol("N", "N", FORCE, "force"), tl.Symbol("R", "R", FORCE, "resistance")
    )
    work = Working("Part", notation)
    force = work.given("N", "1 kN")
    nothing = work.given("R", "0 kN")
    unknown = work.given_number("R", math.nan, "test", "unknown")
    work.check("nothing", force, nothing, "1")
    work.check("unknown", force, unknown, "2")
    calc = Calculation.of(work, Heading("P1", "", ""))
    record = json.loads(json.dumps(calc.record(), allow_nan=False))
    first, second = record["checks"]
    assert (first["utilisation"], first["utilisation_text"], first["verdict"]) == (
        None,
        "∞",
        "fail",
    )
    assert "capacity is zero or less" in first["note"]
    assert (second["capacity"], second["utilisation"], second["verdict"]) == (None, None, "fail")
    assert second["utilisation_text"] == "not a number"
    assert "missing" in second["note"]
    assert record["verdict"]["passes"] is False
    for reading in (calc.text(), calc.html()):
        assert "not a number" in reading
        assert "∞" in reading


def test_bundle_offers_four_readings(calc):
    bundle = calc._repr_mimebundle_()
    assert set(bundle) == {
        "text/plain",
        "text/latex",
        "text/html",
        "application/vnd.tensionlib+json",
    }
    assert bundle["text/plain"] == calc.text()
    assert bundle["text/html"] == calc.html()
    assert bundle["text/latex"] == calc.latex()
    assert bundle["application/vnd.tensionlib+json"] == calc.record()


# Units --------------------------------------------------------------------------------------

METRIC_UNITS = re.compile(r"\d\s*(?:mm|kN|MPa|kPa)\b|<mtext>(?:mm|kN|MPa)|\\text\{(?:mm|kN|MPa)\}")
US_UNITS = re.compile(r"\d\s*(?:in|kip|ksi)\b|<mtext>(?:in|kip|ksi)|\\text\{(?:in|kip|ksi)\}")


@pytest.mark.parametrize("reading", ["text", "latex", "html"])
def test_each_view_keeps_to_its_own_units(reading):
    metric = CASES["bolted"]()
    shown = {}
    for calc in (metric, metric.shown_in(US)):
        words = getattr(calc, reading)()
        # The drawing is in mm, and so are the words that say how well a source is known.
        words = re.sub(r"<figure.*?</figure>", "", words, flags=re.DOTALL)
        known = {source["known"] for source in calc.record()["sources"]}
        for said in sorted(known, key=len, reverse=True):
            words = words.replace(said, "")
        shown[calc.view] = words
    assert len(US_UNITS.findall(shown[US])) > 100
    assert METRIC_UNITS.findall(shown[US]) == []
    assert len(METRIC_UNITS.findall(shown[METRIC])) > 100
    assert US_UNITS.findall(shown[METRIC]) == []


def test_units_change_and_the_verdict_does_not():
    metric = CASES["bolted"]()
    us = metric.shown_in(US)
    pairs = list(zip(metric.record()["checks"], us.record()["checks"], strict=True))
    assert [a["utilisation"] for a, _ in pairs] == [b["utilisation"] for _, b in pairs]
    assert us["bolt shear"].demand == metric["bolt shear"].demand
    sizes = {view: view.unit(FORCE).size for view in (METRIC, US)}
    strength = next((a, b) for a, b in pairs if a["name"] == "bolt shear")
    assert strength[0]["unit"] == "kN"
    assert strength[1]["unit"] == "kip"
    assert strength[1]["capacity"] * sizes[US] == pytest.approx(
        strength[0]["capacity"] * sizes[METRIC], rel=1e-12
    )
