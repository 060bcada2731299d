"""What of a notebook goes into a package, and what does not."""

from __future__ import annotations

import base64
import json

import pytest

from tensionlib.errors import InputError
from tensionlib.package.document import (
    Calculated,
    Code,
    Equations,
    Picture,
    Printed,
    Prose,
    Scheduled,
    picture,
    plain,
    read,
    settled,
)

PNG = base64.b64decode(
    "iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg=="
)


def output(make, **data):
    mimetypes = {
        "latex": "text/latex",
        "text": "text/plain",
        "png": "image/png",
        "svg": "image/svg+xml",
        "widget": "application/vnd.jupyter.widget-view+json",
        "markdown": "text/markdown",
        "html": "text/html",
    }
    return make.output("display_data", {mimetypes[key]: value for key, value in data.items()})


def blocks(make, *cells):
    return read(make.notebook(*cells)).blocks


def test_blocks_come_in_the_order_of_the_notebook_with_their_cell_numbers(make):
    found = blocks(
        make,
        make.markdown("# Title"),
        make.code(make.shown(make.calculation("RB1"))),
        make.markdown("   "),
        make.code(make.shown(make.schedule([make.calculation("RB2")]))),
    )
    assert [(type(block), block.cell) for block in found] == [
        (Prose, 1),
        (Calculated, 2),
        (Scheduled, 4),
    ]


def test_the_record_wins_over_every_other_form_of_an_output(make):
    (block,) = blocks(make, make.code(make.shown(make.calculation("RB1"))))
    assert isinstance(block, Calculated)
    assert block.record["mark"] == "RB1"


@pytest.mark.parametrize(
    ("data", "kind"),
    [
        ({"latex": "$a$", "svg": "<svg/>", "text": "x"}, Equations),
        ({"svg": "<svg/>", "png": "", "text": "x"}, Picture),
        ({"png": base64.b64encode(PNG).decode(), "text": "<Figure>"}, Picture),
        ({"markdown": "*a*", "text": "<object>"}, Prose),
        ({"html": "<table/>", "text": "a  b"}, Printed),
    ],
)
def test_the_best_form_of_an_output_is_printed(make, data, kind):
    (block,) = blocks(make, make.code(output(make, **data)))
    assert type(block) is kind


@pytest.mark.parametrize(
    "data",
    [
        {"text": "None"},
        {"text": "  "},
        {"widget": {"model_id": "ab"}, "text": "Dropdown(options=())"},
        {"text": "[<matplotlib.lines.Line2D at 0x7f6a2c0b5e10>]"},
        {"text": "<IPython.core.display.HTML object>", "html": "<b>x</b>"},
        {"text": "<Figure size 640x480 with 1 Axes>"},
    ],
)
def test_outputs_without_words_of_their_own_are_not_printed(make, data):
    assert blocks(make, make.code(output(make, **data))) == ()


def test_a_repr_with_facts_in_it_is_printed(make):
    (block,) = blocks(make, make.code(output(make, text="<check Member, yield: 285 kN, pass>")))
    assert block == Printed(1, "<check Member, yield: 285 kN, pass>")


def test_code_is_hidden_unless_its_cell_is_tagged(make):
    hidden = make.code(source="secret()")
    shown = make.code(source="A = b*d  # area\n", tags=("show-code",))
    assert blocks(make, hidden, shown) == (Code(2, "A = b*d  # area"),)


def test_the_tag_hide_drops_the_output_but_not_what_the_cover_needs(make):
    document = read(
        make.notebook(
            make.code(make.shown(make.project()), tags=("hide",)),
            make.code(make.shown(make.calculation()), tags=("hide",)),
            make.markdown("gone", metadata={"tags": ["hide"]}),
        )
    )
    assert document.blocks == ()
    assert document.project["job_number"] == "4711"


def test_standard_output_is_printed_in_one_piece_and_standard_error_is_not(make):
    stream = [
        make.output("stream", name=name, text=text)
        for name, text in (("stdout", "one\n"), ("stdout", "two\n"), ("stderr", "a warning\n"))
    ]
    assert blocks(make, make.code(*stream)) == (Printed(1, "one\ntwo"),)


def test_plain_text_loses_colours_overwritten_lines_and_addresses():
    text = "\x1b[31mred\x1b[0m\n10 %\r100 %\r\n<thing at 0x7f6a2c0b5e10>\x07\tend"
    assert plain(text) == "red\n100 %\n<thing at 0x0>  end"


@pytest.mark.parametrize(
    ("latex", "rows"),
    [
        (r"$285\ \text{kN}$", (r"285\ \text{kN}",)),
        (r"$\displaystyle x^{2}$", ("x^{2}",)),
        (
            "\\[\n\\begin{aligned}\nA &= b \\cdot d \\\\[10pt]\nB &= \\frac{A}{2} &= 6\n"
            "\\end{aligned}\n\\]",
            (r"A = b \cdot d", r"B = \frac{A}{2} = 6"),
        ),
        (r"\begin{align*}a &= 1 & b &= 2\end{align*}", (r"a = 1 \qquad b = 2",)),
        (
            r"$$\begin{cases} a & b \\ c & d \end{cases} \\ x \& y$$",
            (r"\begin{cases} a & b \\ c & d \end{cases}", r"x \& y"),
        ),
        (r"\frac{a \\ b}{c}", (r"\frac{a \\ b}{c}",)),
    ],
)
def test_latex_output_is_taken_apart_into_rows(make, latex, rows):
    assert blocks(make, make.code(output(make, latex=latex))) == (Equations(1, rows),)


def test_latex_output_with_words_in_it_is_prose(make):
    (block,) = blocks(
        make, make.code(output(make, latex="where $a$ is the area and $b$ the width"))
    )
    assert isinstance(block, Prose)


def test_a_cell_that_was_not_run_is_refused_by_number(make):
    cell = make.code()
    cell["execution_count"] = None
    with pytest.raises(InputError, match=r"cell 2 has not been run.*--execute"):
        read(make.notebook(make.markdown("a"), cell))
    cell["metadata"]["tags"] = ["skip-execution"]
    assert read(make.notebook(make.markdown("a"), cell)).blocks


def test_a_cell_that_ended_in_an_error_is_refused_unless_that_was_meant(make):
    error = make.output("error", ename="InputError", evalue="t: got 0", traceback=["/home/x"])
    with pytest.raises(InputError, match="cell 1 ended in an error: InputError: t: got 0"):
        read(make.notebook(make.code(error)))
    meant = make.code(error, tags=("raises-exception",))
    assert read(make.notebook(meant)).blocks == (Printed(1, "InputError: t: got 0"),)


@pytest.mark.parametrize(
    ("change", "message"),
    [
        ({"version": 2}, r"cell 1: the record has format version 2; .* reads 1"),
        ({"format": "other"}, "cell 1: .* holds something other than a record"),
    ],
)
def test_a_record_that_cannot_be_read_is_refused(make, change, message):
    record = {**make.calculation(), **change}
    with pytest.raises(InputError, match=message):
        read(make.notebook(make.code(make.shown(record))))


def test_an_incomplete_record_is_refused_by_what_it_lacks(make):
    record = make.calculation("RB7")
    del record["checks"], record["headline"]
    with pytest.raises(InputError, match="cell 1: the record of RB7 lacks headline, checks"):
        read(make.notebook(make.code(make.shown(make.schedule([record])))))


def test_a_record_of_another_kind_is_printed_in_its_plain_form(make):
    study = {"format": "tensionlib", "version": 1, "kind": "study"}
    cell = make.output("display_data", {make.mimetype: study, "text/plain": "12 alternatives"})
    assert blocks(make, make.code(cell)) == (Printed(1, "12 alternatives"),)


def test_two_different_projects_are_refused_and_the_same_one_twice_is_not(make):
    def cells(*revisions):
        return [make.code(make.shown(make.project(revision=one))) for one in revisions]

    assert read(make.notebook(*cells("B", "B"))).project["revision"] == "B"
    with pytest.raises(InputError, match="cells 1 and 2 show two different projects"):
        read(make.notebook(*cells("B", "C")))


def test_a_calculation_shown_twice_counts_once_and_failing_ones_are_known(make):
    good, bad = make.calculation("RB1"), make.calculation("RB2", word="FAIL")
    open_ = make.calculation("RB3", word="NOT COVERED")
    unchecked = make.calculation("W1", verdict={"passes": False, "word": "", "governing": None})
    document = read(
        make.notebook(
            make.code(make.shown(make.schedule([good, bad]))),
            make.code(make.shown(good)),
            make.code(make.shown(open_), make.shown(unchecked)),
        )
    )
    assert [one.record["mark"] for one in document.calculations] == ["RB1", "RB2", "RB3", "W1"]
    assert [record["mark"] for record in document.failing] == ["RB2", "RB3"]


# Files ------------------------------------------------------------------------------------------


def test_design_file_and_schedule_are_attached_from_the_folder_of_the_notebook(make, tmp_path):
    (tmp_path / "canopy.toml").write_text("a = 1\n")
    (tmp_path / "members.csv").write_text("mark\nRB1\n")
    cells = [
        make.code(make.shown(make.project())),
        make.code(make.shown(make.schedule([make.calculation()]))),
    ]
    document = read(make.notebook(*cells), "canopy", tmp_path)
    assert [one.name for one in document.attachments] == [
        "canopy.ipynb",
        "record.json",
        "canopy.toml",
        "members.csv",
    ]
    assert document.attachments[2].data == b"a = 1\n"
    record = json.loads(document.attachments[1].data)
    assert [one["kind"] for one in record] == ["project", "schedule"]


@pytest.mark.parametrize("name", ["../secret.toml", "{secret}", "link.toml", "", "folder", "a\0b"])
def test_nothing_outside_the_folder_is_attached(make, tmp_path, name):
    secret = tmp_path / "secret.toml"
    secret.write_text("secret")
    home = tmp_path / "home"
    (home / "folder").mkdir(parents=True)
    (home / "link.toml").symlink_to(secret)
    named = make.code(make.shown(make.project(design_file=name.format(secret=secret))))
    document = read(make.notebook(named), "canopy", home)
    assert [one.name for one in document.attachments] == ["canopy.ipynb", "record.json"]


def test_pictures_come_from_the_folder_or_from_the_cell_and_from_nowhere_else(make, tmp_path):
    home = tmp_path / "home"
    (home / "img").mkdir(parents=True)
    (home / "img" / "a plan.png").write_bytes(PNG)
    (home / "notes.txt").write_text("words")
    (tmp_path / "outside.png").write_bytes(PNG)
    cell = make.markdown("x", attachments={"b.png": {"image/png": base64.b64encode(PNG).decode()}})
    document = read(make.notebook(cell), "canopy", home)
    (block,) = document.blocks
    for source in ("img/a%20plan.png", "img/a plan.png", "attachment:b.png"):
        found = picture(document, block, source)
        assert found is not None
        assert (found.kind, found.data) == ("png", PNG)
    for source in (
        "../outside.png",
        str(tmp_path / "outside.png"),
        f"file://{tmp_path}/outside.png",
        "https://example.org/x.png",
        "notes.txt",
        "attachment:none.png",
        "missing.png",
    ):
        assert picture(document, block, source) is None


# Equal runs -------------------------------------------------------------------------------------


def test_two_runs_that_differ_in_timings_and_luck_settle_to_the_same_notebook(make):
    def run(address, times, pieces):
        cell = make.code(
            *[make.output("stream", name="stdout", text=piece) for piece in pieces],
            output(make, text=f"<thing at {address}>"),
            output(make, widget={"model_id": address}, text="Dropdown()"),
            make.output("error", ename="E", evalue="v", traceback=[address]),
        )
        cell["metadata"]["execution"] = {"iopub.execute_input": times}
        notebook = make.notebook(make.markdown("a"), cell)
        notebook["metadata"]["widgets"] = {"state": address}
        return notebook

    first = settled(run("0x7f6a2c0b5e10", "09:00", ["ab\n", "c\n"]))
    second = settled(run("0x7f0011223344", "10:00", ["ab\nc\n"]))
    assert first == second
    assert [cell["id"] for cell in first["cells"]] == ["c1", "c2"]


def test_cells_without_an_id_are_numbered(make):
    notebook = make.notebook(make.markdown("a"))
    del notebook["cells"][0]["id"]
    assert settled(notebook)["cells"][0]["id"] == "cell-1"
