"""LaTeX of records as MathML: nothing lost, nothing moved."""

from __future__ import annotations

import re
from xml.etree import ElementTree

import pytest

import tensionlib as tl
from tensionlib.calculation.readings import mathml
from tests.builders import member, two_lines, welded


def _inside(latex: str) -> str:
    shown = mathml.of(latex)
    ElementTree.fromstring(shown)
    return shown.removeprefix('<math displaystyle="true">').removesuffix("</math>")


@pytest.mark.parametrize(
    ("latex", "expected"),
    [
        ("12.5", "<mn>12.5</mn>"),
        (r"A_{g}", "<msub><mi>A</mi><mrow><mi>g</mi></mrow></msub>"),
        (r"N^{*}", "<msup><mi>N</mi><mrow><mo>*</mo></mrow></msup>"),
        (
            r"N^{*}_{c}",
            "<msubsup><mi>N</mi><mrow><mi>c</mi></mrow><mrow><mo>*</mo></mrow></msubsup>",
        ),
        (
            r"\frac{L}{2}",
            "<mfrac><mrow><mi>L</mi></mrow><mrow><mn>2</mn></mrow></mfrac>",
        ),
        (r"\sqrt{2}", "<msqrt><mrow><mn>2</mn></mrow></msqrt>"),
        (r"250\ \text{kN}", '<mn>250</mn><mspace width=".25em"/><mtext>kN</mtext>'),
        (
            r"\text{mm}^{2}",
            "<msup><mtext>mm</mtext><mrow><mn>2</mn></mrow></msup>",
        ),
        (r"\text{not a number}", "<mtext>not a number</mtext>"),
        (r"a \leq b", "<mi>a</mi><mo>≤</mo><mi>b</mi>"),
        ("a < b", "<mi>a</mi><mo>&lt;</mo><mi>b</mi>"),
        ("a - b", '<mi>a</mi><mo form="infix">−</mo><mi>b</mi>'),
        ("+ b", '<mo form="infix">+</mo><mi>b</mi>'),
        ("-2", "<mo>−</mo><mn>2</mn>"),
        (r"\min", "<mi>min</mi>"),
        (r"\phi", "<mi>ϕ</mi>"),
        (r"\infty", "<mi>∞</mi>"),
    ],
)
def test_pieces(latex, expected):
    assert _inside(latex) == expected


def test_brackets_hold_what_stands_between_them():
    math = ElementTree.fromstring(mathml.of(r"\left( a + \frac{b}{c} \right)^{2}"))
    (power,) = math
    assert power.tag == "msup"
    base, exponent = power
    assert [child.text for child in (base[0], base[-1])] == ["(", ")"]
    assert [child.tag for child in base] == ["mo", "mi", "mo", "mfrac", "mo"]
    assert exponent[0].text == "2"


@pytest.mark.parametrize(
    "latex",
    [r"\unheard{x}", r"\frac{a}", r"{a", r"a}", r"\left( a", r"a \right)", r"\text", "a_", "x # y"],
)
def test_what_is_not_read_is_shown_as_it_is(latex):
    assert ElementTree.fromstring(mathml.of(latex))[0].text == latex


def test_hostile_latex_is_escaped():
    for latex in (r"\text{<script>}", "<script>", r"\unheard<script>"):
        assert "<script" not in mathml.of(latex)
        ElementTree.fromstring(mathml.of(latex))


def _said(latex: str) -> str:
    """The marks of LaTeX source that stand for something seen, in order."""
    words = {
        r"\ ": "",
        r"\,": "",
        r"\cdot": "⋅",
        r"\leq": "≤",
        r"\geq": "≥",
        r"\phi": "ϕ",
        r"\lambda": "λ",
        "-": "−",
    }
    words |= {rf"\{name}": name for name in ("min", "max", "lim", "tan")}
    words |= {rf"\{name}": "" for name in ("left", "right", "text", "mathrm", "frac", "sqrt")}
    for before, after in words.items():
        latex = latex.replace(before, after)
    return re.sub(r"[\s{}_^]", "", latex)


@pytest.mark.parametrize(
    "calc",
    [
        lambda: tl.design(member(), "250 kN"),
        lambda: tl.design(member("200 PFC", two_lines(to="web")), "250 kN"),
        lambda: tl.design(member(end=welded(length_2="90 mm", transverse="125 mm")), "250 kN"),
    ],
)
def test_every_step_of_a_calculation_is_read_whole(calc):
    record = calc().record()
    steps = [
        step
        for part in record["parts"]
        for line in part["lines"]
        for step in [line["latex"], *line["steps"]]
    ]
    assert len(steps) > 100
    for step in steps:
        math = ElementTree.fromstring(mathml.of(step))
        shown = "".join(re.sub(r"\s", "", text) for text in math.itertext())
        # Sub- and superscripts of one base come in a fixed order, whichever the source gives first.
        assert sorted(shown) == sorted(_said(step)), step
        if "^{*}_" not in step:
            assert shown == _said(step)
