"""The estimate of a formula's width against the width it is set at."""

from __future__ import annotations

import json

import pytest

from tensionlib.package.markup import Formulas, convert
from tensionlib.package.reach import reach

typst = pytest.importorskip("typst")
pytest.importorskip("pypandoc")

FORMULAS = [
    r"A_{n} = A_{g} - n_{h} \cdot d_{h} \cdot t",
    r"\phi N_{t} = 0.9 \cdot 0.85 \cdot 0.85 \cdot 1640\ \text{mm}^{2} \cdot 440\ \text{MPa}",
    r"\min\left(\phi N_{ty},\ \phi N_{tu}\right)",
    r"N_{c}^{*} \leq \phi V_{f}",
    r"137.66\ \text{kN} \leq 277.88\ \text{kN}",
    r"\frac{4600\ \text{mm}}{16.209\ \text{mm}} = 283.79",
    r"L_{j} = \left(n_{p} - 1\right) \cdot s_{p} = \left(3 - 1\right) \cdot 70\ \text{mm}",
    r"e_{\text{max},p} = 12 \cdot t_{p}",
    r"b_{d} = 2 \cdot L_{j} \cdot \tan\left(30\ \text{deg}\right)",
    r"\sqrt{x^{2} + y^{2}}",
    "C_{1}",
    r"1.16\ \text{kN}/\text{mm}",
]


@pytest.fixture(scope="module")
def written():
    formulas = Formulas()
    for tex in FORMULAS:
        formulas.index(tex, 1)
    return convert([], formulas)[1]


@pytest.fixture(scope="module")
def widths(written, tmp_path_factory):
    """Width of each formula in ems, as set."""
    folder = tmp_path_factory.mktemp("widths")
    (folder / "sources.json").write_text(json.dumps(written))
    (folder / "main.typ").write_text(
        '#show math.equation: set text(font: "New Computer Modern Math")\n'
        "#set text(size: 10pt)\n"
        '#let sources = json("sources.json")\n'
        "#let width(source) = {\n"
        '  let body = eval("$" + source + "$").body\n'
        "  measure(math.equation(math.display(body))).width / 10pt\n"
        "}\n"
        "#context [#metadata(sources.map(width)) <widths>]\n"
    )
    answer = typst.query(
        folder / "main.typ",
        "<widths>",
        field="value",
        one=True,
        root=folder,
        ignore_system_fonts=True,
    )
    return json.loads(answer)


@pytest.mark.parametrize("place", range(len(FORMULAS)), ids=FORMULAS)
def test_the_estimate_is_near_the_width_as_set(written, widths, place):
    # A fifth of an em either way matters to nobody; a tenth under would be cut close.
    assert reach(written[place]) >= 0.9 * widths[place] - 0.2
    assert reach(written[place]) <= 1.25 * widths[place] + 0.2


@pytest.mark.parametrize("odd", ["", ")", "(", "((", "a,b", '"', "frac(", ")))(("])
def test_anything_has_an_estimate(odd):
    assert 0.0 <= reach(odd) < 5.0
