"""Markdown and TeX through pandoc: what is let through and what becomes plain words."""

from __future__ import annotations

import sys

import pytest

from tensionlib.errors import InputError, TensionlibError
from tensionlib.package.markup import Formulas, Heading, Image, convert

pytest.importorskip("pypandoc")


def markup(text):
    (one,), _ = convert([(1, text)], Formulas())
    return one.markup.strip()


def formula(tex):
    formulas = Formulas()
    formulas.index(tex, 3)
    _, (written,) = convert([], formulas)
    return written


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("[a](https://example.org)", '#link("https://example.org")[a]'),
        ("[a](mailto:a@example.org)", '#link("mailto:a@example.org")[a]'),
        ("[a](javascript:alert(1))", "a"),
        ("[a](JAVASCRIPT:alert(1))", "a"),
        ("[a](file:///etc/passwd)", "a"),
        ("[a](other.ipynb)", "a"),
        ("<b>x</b>", r"\<b\>x\</b\>"),
        ("<script>alert(1)</script>", r"\<script\>alert(1)\</script\>"),
        ("a <!-- note --> b", "a b"),
        ("a<br>b", "a \\\nb"),
        ('#panic("x")', r"\#panic(\"x\")"),
        ("@ref and <label>", r"\@ref and \<label\>"),
        ("it costs $5 and $6", r"it costs \$5 and \$6"),
        ("~~old~~ **new**", "#strike[old] #strong[new]"),
    ],
)
def test_only_harmless_markup_gets_through(text, expected):
    assert markup(text) == expected


def test_raw_blocks_of_the_typesetters_own_language_stay_words():
    assert markup('```{=typst}\n#panic("x")\n```').startswith("```")
    assert markup('`#panic("x")`{=typst}').startswith("`")


def test_a_list_needs_no_blank_line_before_it():
    assert markup("Assumed:\n- a\n- b").endswith("- a\n- b")


def test_what_is_left_open_in_one_cell_does_not_swallow_the_next():
    cells = [(1, "```\ncode left open"), (2, "plain"), (3, "| a |\n|---|\n| $x"), (4, "> quote")]
    converted, _ = convert([*cells, (5, "last")], Formulas())
    assert converted[1].markup.strip() == "plain"
    assert converted[4].markup.strip() == "last"


def test_pictures_and_headings_are_handed_over_as_data():
    (one,), _ = convert([(1, '# A *b*\n\n![a "plan"](x%20y.png "t")\n\n## C')], Formulas())
    assert one.images == (Image("x%20y.png", 'a "plan"'),)
    assert "#picture(0);" in one.markup
    assert "x%20y" not in one.markup
    assert one.headings == (Heading(1, "A b"), Heading(2, "C"))


def test_words_that_look_like_a_picture_call_stay_words():
    assert markup("#picture(0);") == r"\#picture(0);"


@pytest.mark.parametrize(
    ("tex", "expected"),
    [
        (r"\frac{A_{g}}{2}", "A_g / 2"),
        (r"1860\ \text{mm}^{2}", '1860 med upright("mm")^2'),
        (r"N^{*} \leq \phi N_{t}", "N^(*) lt.eq phi.alt N_t"),
    ],
)
def test_formulas_are_written_for_the_typesetter(tex, expected):
    assert formula(tex) == expected


@pytest.mark.parametrize("text", [r"so $\unknown{x}$ it is", "$$\n\\unknown{x}\n$$"])
def test_unknown_tex_in_prose_is_an_error_that_names_the_cell(text):
    with pytest.raises(InputError, match=r"cell 7: .*\\unknown"):
        convert([(2, "fine"), (7, text)], Formulas())


@pytest.mark.parametrize("tex", [r"\unknown{x}", "a $b$ c", r"\frac{a}{b"])
def test_unknown_tex_in_a_formula_is_an_error_that_names_the_cell(tex):
    formulas = Formulas()
    formulas.index("a + b", 1)
    formulas.index(tex, 5)
    formulas.index(tex, 9)
    with pytest.raises(InputError, match="cell 5: "):
        convert([], formulas)


def test_an_environment_outside_mathematics_is_an_error():
    with pytest.raises(InputError, match=r"cell 1: \\begin{align} stands outside mathematics"):
        markup("\\begin{align}\na &= b\n\\end{align}")


def test_a_formula_is_kept_once_whatever_its_blanks():
    formulas = Formulas()
    assert [formulas.index(tex, 1) for tex in ("a +  b", "c", " a + b ")] == [0, 1, 0]
    assert formulas.tex == ["a + b", "c"]


@pytest.mark.parametrize(
    "hostile",
    [r"\text{\"); panic(\"q}", r"\text{#panic()}", r"\text{\$ x \$}", "a; b", "a, b", r"\text{]}"],
)
def test_a_hostile_formula_leaves_its_neighbours_alone(hostile):
    formulas = Formulas()
    for tex in ("a", hostile, "b"):
        formulas.index(tex, 1)
    _, written = convert([], formulas)
    assert (written[0], written[2]) == ("a", "b")


def test_without_pandoc_the_extra_is_named(monkeypatch):
    monkeypatch.setitem(sys.modules, "pypandoc", None)
    with pytest.raises(TensionlibError, match=r'pip install "tensionlib\[package\]"'):
        markup("a")
