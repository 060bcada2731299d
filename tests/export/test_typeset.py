"""The package as it comes out: pages, words, margins, attachments, and equal bytes."""

from __future__ import annotations

import datetime
import functools
import hashlib
import io
import json
import re
import shutil
import subprocess
import sys

import pytest

from tensionlib.errors import InputError, TensionlibError
from tensionlib.package.document import read
from tensionlib.package.typeset import _shape, typeset

pypdf = pytest.importorskip("pypdf")
pytest.importorskip("typst")
pytest.importorskip("pypandoc")

HOSTILE = 'A # $x$ \\foo [b] "q" <script>alert(1)</script> *c* _i_ @ref `d` #panic("no") // end'
MM = 72 / 25.4
LEFT, RIGHT = 23, 17  # margins in mm


def pdf_of(make, *cells, folder=None, name="canopy", paper=None):
    return typeset(read(make.notebook(*cells), name, folder), paper)


@functools.cache
def pages_of(pdf):
    """The text of each page, blanks and line ends made equal."""
    reader = pypdf.PdfReader(io.BytesIO(pdf))
    return [" ".join(page.extract_text().replace("\u200b", "").split()) for page in reader.pages]


def text_of(make, *cells, **more):
    return " ".join(pages_of(pdf_of(make, *cells, **more)))


@pytest.fixture(scope="module")
def members(make):
    words = ["PASS", "PASS", "FAIL", "PASS", "NOT COVERED", "PASS", "PASS", "PASS"]
    return [
        make.calculation(f"RB{i}", f"brace {i}", word=word) for i, word in enumerate(words, start=1)
    ]


@pytest.fixture(scope="module")
def package(make, members, tmp_path_factory):
    """A whole package, with a schedule, a failing member, and one that is not covered."""
    folder = tmp_path_factory.mktemp("job")
    (folder / "canopy.toml").write_text('title = "Canopy"\n')
    return pdf_of(
        make,
        make.markdown("# Canopy\n\nThe canopy hangs from **eight** braces."),
        make.code(make.shown(make.project())),
        make.markdown("## Schedule"),
        make.code(make.shown(make.schedule(members[:7]))),
        make.markdown("## One more"),
        make.code(make.shown(members[7])),
        make.code(make.shown(members[0])),
        folder=folder,
    )


# What stands in it ------------------------------------------------------------------------------


def test_it_is_a_pdf_for_keeping_with_the_date_and_title_of_the_job(package):
    reader = pypdf.PdfReader(io.BytesIO(package))
    assert reader.xmp_metadata.rdf_root.toxml().count("<pdfaid:part>3</pdfaid:part>") == 1
    assert "<pdfaid:conformance>B</pdfaid:conformance>" in reader.xmp_metadata.rdf_root.toxml()
    assert reader.metadata.title == "4711 – Canopy at the east entrance"
    assert reader.metadata.author == "A. Maker"
    assert reader.metadata.creation_date == datetime.datetime(2026, 3, 5, tzinfo=datetime.UTC)


def test_the_sections_stand_in_their_order(package):
    pages = pages_of(package)
    assert "Canopy at the east entrance" in pages[0]
    text = " ".join(pages[2:])
    places = [
        text.index(title)
        for title in (
            "Summary of results",
            "Basis of design",
            "The canopy hangs from eight braces.",
            "Braces of the canopy",
            "RB1 – brace 1",
            "One more",
            "RB8 – brace 8",
            "Notation",
            "Record of production",
            "Sign-off",
            "Cautions",
        )
    ]
    assert places == sorted(places)
    assert "Document control" in pages[1]
    assert "Contents" in pages[1]


def test_every_page_but_the_cover_says_which_job_revision_status_and_page(package):
    pages = pages_of(package)
    assert "Page 1 of" not in pages[0]
    for number, page in enumerate(pages[1:], start=2):
        assert f"Page {number} of {len(pages)}" in page
        assert "4711" in page
        assert "Canopy at the east entrance" in page
        assert "Revision B" in page
    assert all("DRAFT" in page for page in pages)


def test_an_issued_package_is_not_called_a_draft_and_anything_else_is(make):
    cells = [make.markdown("# Words")]
    issued = make.code(make.shown(make.project(status="issued")))
    pages = pages_of(pdf_of(make, *cells, issued))
    assert not any("DRAFT" in page for page in pages)
    assert "issued" in pages[2]
    unknown = make.code(make.shown(make.project(status="")))
    assert all("DRAFT" in page for page in pages_of(pdf_of(make, *cells, unknown)))
    assert all("DRAFT" in page for page in pages_of(pdf_of(make, *cells)))


def test_the_summary_names_the_page_on_which_each_calculation_stands(package):
    pages = pages_of(package)
    summary = next(page for page in pages if "Summary of results" in page and "MARK" in page)
    for number in range(1, 9):
        row = re.search(rf"RB{number} 150x90x10 UA 285 kN .*?(\d+)(?= RB| \d+ of| Basis)", summary)
        assert row is not None
        there = int(row[1])
        assert f"RB{number} – brace {number}" in pages[there - 1]


def test_verdicts_are_words_wherever_they_stand(package):
    text = " ".join(pages_of(package))
    assert "2 of 8 do not pass: RB3 (FAIL), RB5 (NOT COVERED)." in text
    assert "1.204 FAIL" in text
    assert "1.204 fail" in text
    assert "0.873 PASS" in text
    assert "9.1.9 not covered" in text


def test_a_calculation_prints_each_line_with_its_clause_and_note(package):
    text = " ".join(pages_of(package))
    squeezed = text.replace(" ", "")
    assert "netarea𝐴𝑛=𝐴𝑔−𝑛ℎ⋅𝑑ℎ⋅𝑡=1860mm2−1⋅22mm⋅10mm=1640mm27.2" in squeezed
    assert "designtensionforce𝑁∗285kNschedulerow3" in squeezed
    assert "so k_r = 1.0" in text
    assert "utilisation 0.607: pass" in text
    assert "NOT COVERED block shear of a staggered pattern 9.1.9" in text
    assert "this pattern has no rule in the clause" in text
    assert "Not checked here (1) fatigue; (2) corrosion allowance." in text


def test_an_input_of_both_ends_says_of_which_end_it_is(make):
    rows = [
        {"part": part, "latex": latex, "meaning": meaning, "text": "12 mm", "origin": "given"}
        for part, latex, meaning in (
            ("Member", "L", "length"),
            ("End 1: Gusset", "t_{p}", "thickness"),
            ("End 2: Gusset", "t_{p}", "thickness"),
        )
    ]
    text = text_of(make, make.code(make.shown(make.calculation(inputs=rows))))
    assert "thickness (End 1: Gusset)" in text
    assert "thickness (End 2: Gusset)" in text
    assert "length (Member)" not in text


def test_a_calculation_shown_again_is_referred_to_by_its_page(package):
    pages = pages_of(package)
    there = next(i for i, page in enumerate(pages, 1) if "RB1: 150x90x10" in page)
    assert f"RB1: see page {there}" in " ".join(pages)


def test_the_basis_gathers_sources_members_and_assumptions(make):
    shared, own = "both ends are connected in the same way", "the gusset is flat"
    text = text_of(
        make,
        make.code(make.shown(make.calculation("RB1", assumptions=[shared, own]))),
        make.code(make.shown(make.calculation("RB2", assumptions=[shared]))),
    )
    start = text.rindex("Basis of design")
    basis = text[start : text.index("RB1: 150x90x10", start)]
    assert "NZS 3404:Part 1:1997 member and connection design from memory" in basis
    assert "150x90x10 UA, AS/NZS 3679.1 300 RB1, RB2" in basis
    assert f"– {shared} – {own} (RB1)" in basis


def test_the_notation_holds_each_symbol_once_and_both_of_two_meanings(make):
    other = [{"symbol": "A_n", "latex": "A_{n}", "meaning": "net area in shear", "unit": "mm²"}]
    text = text_of(
        make,
        make.code(make.shown(make.calculation("RB1"))),
        make.code(make.shown(make.calculation("RB2"))),
        make.code(make.shown(make.calculation("RB3", notation=other))),
    )
    notation = text[text.rindex("SYMBOL MEANING UNIT") : text.rindex("Record of production")]
    assert notation.count("net area of the cross-section mm²") == 1
    assert notation.count("net area in shear mm²") == 1
    assert notation.count("design tension force kN") == 1


def test_two_calculations_of_one_mark_are_pointed_out(make):
    one = make.calculation("RB1")
    other = make.calculation("RB1", provenance={"version": "0.1.0", "inputs_hash": "sha256:ff"})
    text = text_of(make, make.code(make.shown(one)), make.code(make.shown(other)))
    assert "The mark RB1 stands for more than one calculation, with different inputs." in text


def test_cautions_name_what_is_known_from_memory_only(make):
    sources = [
        {"name": "Standard M", "use": "a", "known": "from memory"},
        {"name": "Standard P", "use": "b", "known": "read in a printed copy"},
    ]
    text = text_of(make, make.code(make.shown(make.calculation(sources=sources))))
    cautions = text[text.rindex("Cautions") :]
    assert "chartered or licensed engineer" in cautions
    assert "current edition of each standard" in cautions
    assert "Compare it before use: Standard M." in cautions
    assert "Standard P" not in cautions


def test_the_outline_of_the_pdf_leads_to_each_calculation(package):
    titles = []

    def walk(items):
        for item in items:
            if isinstance(item, list):
                walk(item)
            else:
                titles.append(item.title)

    walk(pypdf.PdfReader(io.BytesIO(package)).outline)
    assert "Summary of results" in titles
    assert [title for title in titles if title.startswith("RB")] == [
        f"RB{i} – brace {i}" for i in range(1, 9)
    ]


def test_a_notebook_without_records_is_a_package_of_its_words(make):
    pages = pages_of(pdf_of(make, make.markdown("# Site notes\n\nWords only."), name="notes"))
    assert "Site notes" in pages[0]
    text = " ".join(pages)
    assert "Words only." in text
    assert "Summary of results" not in text
    assert "notes.ipynb" in text


# Paper and margins ------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("stated", "asked", "size"),
    [
        ("A4", None, (210, 297)),
        ("Letter", None, (215.9, 279.4)),
        ("A4", "Letter", (215.9, 279.4)),
        (None, None, (210, 297)),
    ],
)
def test_the_paper_is_the_one_asked_for_else_the_projects_own(make, stated, asked, size):
    cells = [make.code(make.shown(make.project(paper=stated)))] if stated else []
    pdf = pdf_of(make, make.markdown("# Words"), *cells, paper=asked)
    box = pypdf.PdfReader(io.BytesIO(pdf)).pages[0].mediabox
    assert (float(box.width) / MM, float(box.height) / MM) == pytest.approx(size, abs=0.1)


def test_another_paper_is_refused(make):
    with pytest.raises(InputError, match="paper: got 'A3'; give 'A4' or 'Letter'"):
        pdf_of(make, make.markdown("x"), paper="A3")


def extreme_cells(make, paper):
    """Everything that could run off a page: long formulas of each shape and long words."""
    terms = " + ".join(rf"a_{{{i}}} \cdot {i}.123\ \text{{kN}}" for i in range(40))
    line = make.line
    shapes = [
        terms,
        rf"\frac{{{terms}}}{{{terms}}}",
        rf"\frac{{\frac{{{terms}}}{{2}} + 1}}{{\sqrt{{{terms}}}}}",
        rf"\min\left({terms}\right)",
        rf"0.9 \cdot \left(\frac{{{terms}}}{{2}} + \left({terms}\right)^{{2}}\right)",
        r"\text{" + "words " * 50 + "}",
    ]
    lines = [line("formula", f"shape {i}", "B", tex, tex, "12") for i, tex in enumerate(shapes)]
    lines += [
        line("formula", "long left side", r"\text{" + "side " * 50 + "}", "a + b", "12"),
        line("formula", "W" * 120, "a", "b", clause="C" * 90, note="N" * 200),
        line("fixed", "W" * 120, "a", terms, clause="C" * 90, note="N" * 200),
        line("holds", "tested", "", terms + r" \leq 3", r"4 \leq 3"),
    ]
    record = make.calculation(
        "M" * 60,
        "T" * 200,
        parts=[{"title": "P" * 150, "lines": lines}],
        headline="H" * 300,
        subject="S" * 80,
        inputs=[
            {
                "symbol": "x",
                "latex": "x_{" + "y" * 60 + "}",
                "meaning": "m" * 90,
                "text": "9" * 60,
                "origin": "o" * 90,
            }
        ],
        checks=[
            make.check("c" * 90, 0.5, note="n" * 90),
            make.check("x", 0.5, part="p" * 50),
            make.check("x", 0.5, clause="1" * 40),
            make.check("x", 0.5, demand_text="9" * 40),
        ],
        assumptions=["A" * 300],
        sources=[{"name": "N" * 90, "use": "u" * 90, "known": "k" * 90}],
        notation=[
            {"symbol": "x", "latex": "x_{" + "y" * 90 + "}", "meaning": "m" * 90, "unit": "u" * 60}
        ],
    )
    project = make.project(
        paper=paper,
        title="T" * 300,
        client="C" * 200,
        made_by="M" * 90,
        job_number="J" * 90,
        revision="R" * 60,
    )
    prose = (
        f"$${terms}$$\n\ninline $\\frac{{{terms}}}{{2}}$ and ${terms}$\n\n"
        f"$$\\begin{{aligned}} a &= {terms} \\\\ &= 2\\end{{aligned}}$$\n\n"
        f"- list with $\\frac{{{terms}}}{{2}}$\n\n  $${terms}$$\n\n"
        f"| {'h' * 200} | b |\n|--|--|\n| {'w' * 300} | ${terms}$ |\n\n{'L' * 500}\n\n"
        f"```\n{'code ' * 100}\n{'X' * 400}\n```\n\n`{'q' * 300}`"
    )
    return [
        make.code(make.shown(project)),
        make.code(make.shown(record)),
        make.markdown(prose),
        make.code(
            make.output("stream", name="stdout", text="z" * 500 + "\n" + "word " * 100),
            make.output("display_data", {"text/latex": f"$${terms}$$"}),
            make.output("display_data", {"image/svg+xml": make.svg(4000, 300)}),
            source="s" * 300,
            tags=("show-code",),
        ),
    ]


@pytest.mark.skipif(shutil.which("pdftotext") is None, reason="pdftotext is not installed")
@pytest.mark.parametrize(("paper", "width"), [("A4", 210.0), ("Letter", 215.9)])
def test_nothing_leaves_the_margins_however_long_it_is(make, tmp_path, paper, width):
    file = tmp_path / "extreme.pdf"
    file.write_bytes(pdf_of(make, *extreme_cells(make, paper), name="n" * 80))
    boxes = subprocess.run(
        ["pdftotext", "-bbox", str(file), "-"], capture_output=True, text=True, check=True
    ).stdout
    height = float(re.search(r'<page width="[\d.]+" height="([\d.]+)"', boxes)[1])
    found = re.findall(
        r'<word xMin="(.*?)" yMin="(.*?)" xMax="(.*?)" yMax="(.*?)">(.*?)</word>', boxes
    )
    assert len(found) > 500
    outside = [
        word
        for left, top, right, bottom, word in found
        if float(left) < LEFT * MM - 0.5
        or float(right) > (width - RIGHT) * MM + 0.5
        or float(top) < 8 * MM
        or float(bottom) > height - 8 * MM
    ]
    assert outside == []
    # Each formula reaches its last term: nothing was cut off on the way.
    assert sum("39.123" in word for *_, word in found) > 20


@pytest.mark.parametrize(
    ("box", "shape"),
    [
        ("0 0 160 80.64", 0.504),
        ("-5,-5, 100,100", 1.0),
        ("0 0 0 50", 0.5),
        ("0 0 50 0", 0.5),
        ("nonsense", 0.5),
    ],
)
def test_the_shape_of_a_sketch_is_that_of_its_view_box(box, shape):
    assert _shape(f'<svg viewBox="{box}"></svg>') == pytest.approx(shape)


# Words stay words -------------------------------------------------------------------------------


def test_hostile_text_is_printed_literally_everywhere(make):
    record = make.calculation(
        HOSTILE,
        HOSTILE,
        headline=f"headline {HOSTILE}",
        assumptions=[f"assumed {HOSTILE}"],
        not_checked=[f"left out {HOSTILE}"],
        parts=[{"title": f"part {HOSTILE}", "lines": [make.line("note", f"note {HOSTILE}")]}],
    )
    project = make.project(title=HOSTILE, client=f"client {HOSTILE}", notes=[f"basis {HOSTILE}"])
    pdf = pdf_of(
        make,
        make.code(make.shown(project)),
        make.code(make.shown(record)),
        make.code(make.output("stream", name="stdout", text=f"printed {HOSTILE}")),
    )
    text = " ".join(pages_of(pdf))
    for start in ("client", "headline", "assumed", "left out", "part", "note", "basis", "printed"):
        assert f"{start} {HOSTILE}" in text
    assert pypdf.PdfReader(io.BytesIO(pdf)).metadata.title == f"4711 – {HOSTILE}"


def test_pictures_of_the_prose_are_set_and_others_are_words(make, tmp_path):
    (tmp_path / "plan.svg").write_text(make.svg(text="from the folder"))
    text = text_of(
        make,
        make.markdown("![plan](plan.svg)\n\n![secret](../plan.svg)\n\n![far](https://e.org/x.png)"),
        folder=tmp_path,
    )
    assert "from the folder" in text
    assert "![secret](../plan.svg)" in text
    assert "![far](https://e.org/x.png)" in text


@pytest.mark.parametrize(
    ("where", "place"),
    [
        ("record", "cell 2, RB1: no font has the character '😀'"),
        ("prose", "cell 1: no font has the character '😀'"),
        ("project", "project client: no font has the character '😀'"),
        ("output", "cell 2: no font has the character '😀'"),
        ("sketch", "cell 2, RB1: no font has the character '😀'"),
    ],
)
def test_a_character_no_font_has_is_named_with_its_place(make, where, place):
    record = make.calculation()
    if where == "record":
        record["assumptions"] = ["all is well 😀 here"]
    if where == "sketch":
        record["sketches"][0]["svg"] = make.svg(text="😀")
    cells = [
        make.markdown("words 😀" if where == "prose" else "words"),
        make.code(
            make.shown(record),
            make.output("stream", name="stdout", text="😀" if where == "output" else "ok"),
        ),
        make.code(make.shown(make.project(client="😀" if where == "project" else "ok"))),
    ]
    with pytest.raises(InputError, match=re.escape(place)) as caught:
        pdf_of(make, *cells)
    assert "(U+1F600)" in str(caught.value)


@pytest.mark.parametrize(
    "svg",
    [
        "<svg",
        '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 9 9">'
        '<image href="/etc/hostname" width="9" height="9"/></svg>',
        '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 9 9">'
        '<image href="../../../../../../../../etc/hostname" width="9" height="9"/></svg>',
    ],
)
def test_a_picture_that_cannot_be_set_is_named_by_its_cell(make, svg):
    cells = [
        make.code(make.output("display_data", {"image/svg+xml": one}))
        for one in (make.svg(), svg, make.svg())
    ]
    with pytest.raises(InputError, match="cell 3, picture: the picture cannot be set"):
        pdf_of(make, make.markdown("x"), cells[0], cells[1], cells[2])


def test_unknown_tex_of_a_record_names_the_cell(make):
    part = {"title": "P", "lines": [make.line("formula", "x", "x", r"\nosuch{a}")]}
    with pytest.raises(InputError, match=r"cell 2: .*\\nosuch"):
        pdf_of(make, make.markdown("x"), make.code(make.shown(make.calculation(parts=[part]))))


def test_a_date_that_is_not_one_is_refused(make):
    cell = make.code(make.shown(make.project(date="5 March")))
    with pytest.raises(InputError, match="project date: got '5 March'.*'2026-03-05'"):
        pdf_of(make, cell)


def test_without_the_typesetter_the_extra_is_named(make, monkeypatch):
    monkeypatch.setitem(sys.modules, "typst", None)
    with pytest.raises(TensionlibError, match=r'pip install "tensionlib\[package\]"'):
        pdf_of(make, make.markdown("x"))


# Attachments and equal bytes --------------------------------------------------------------------


def test_notebook_record_and_design_file_come_back_out_of_the_pdf(package):
    reader = pypdf.PdfReader(io.BytesIO(package))
    assert sorted(reader.attachments) == ["canopy.ipynb", "canopy.toml", "record.json"]
    notebook = json.loads(reader.attachments["canopy.ipynb"][0])
    assert [cell["id"] for cell in notebook["cells"]] == [f"c{i}" for i in range(1, 8)]
    record = json.loads(reader.attachments["record.json"][0])
    assert record[1]["members"][2]["verdict"]["word"] == "FAIL"
    assert reader.attachments["canopy.toml"][0] == b'title = "Canopy"\n'


def test_the_record_of_production_holds_the_fingerprint_of_each_attached_file(package):
    text = " ".join(pages_of(package))
    reader = pypdf.PdfReader(io.BytesIO(package))
    for name in reader.attachments:
        assert hashlib.sha256(reader.attachments[name][0]).hexdigest() in text


def test_the_same_notebook_gives_the_same_bytes(make, members, tmp_path):
    def once():
        return pdf_of(
            make,
            make.markdown("# A\n\n$a_{n} = 2$"),
            make.code(make.shown(make.project())),
            make.code(make.shown(make.schedule(members[:2]))),
            folder=tmp_path,
        )

    assert once() == once()


def test_a_package_without_a_date_has_the_same_bytes_too(make):
    first, second = (pdf_of(make, make.markdown("# Words")) for _ in range(2))
    assert first == second
