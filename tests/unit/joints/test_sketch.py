"""Sketches: to scale, legible at 80 mm, nothing on top of a text, the same bytes each time."""

from __future__ import annotations

import itertools
import xml.etree.ElementTree as ET

import pytest

import tensionlib as tl
from tensionlib.joints.scene import (
    TEXT_HEIGHT,
    Chain,
    Circle,
    Curve,
    Line,
    Scene,
    spread,
    text_width,
)
from tensionlib.joints.sketch import describe, sketch_end
from tensionlib.joints.svg import to_svg
from tensionlib.members.sketching import end_view

PLATE = tl.Gusset("12 mm", "AS/NZS 3678 250")
FORCE = "N* = 285.5 kN"


def _bolted(to, per_line, pitch, end, lines=1, gauge=None, spacing=None, stagger=None, size="M20"):
    return tl.Bolted(
        to=to,
        bolts=f"{size} 8.8/S",
        threads="in shear plane",
        lines=lines,
        per_line=per_line,
        pitch=pitch if per_line > 1 else None,
        gauge=gauge,
        line_spacing=spacing,
        stagger=stagger,
        end_distance=end,
        plate=PLATE,
    )


CASES = {
    **{
        f"{n} bolts at {pitch} in {angle}": (
            angle,
            _bolted("leg", n, f"{pitch} mm", f"{end} mm", gauge="50 mm"),
        )
        for angle, n, (pitch, end) in itertools.product(
            ("90x90x8 EA", "200x200x20 EA"), (1, 2, 3, 5, 8), ((50, 35), (110, 90))
        )
    },
    **{
        f"{n} by two lines in {pair}": (
            pair,
            _bolted("web", n, "70 mm", "40 mm", 2, spacing="70 mm"),
        )
        for pair, n in itertools.product(("2/150 PFC, webs, gap 12 mm", "250 PFC"), (1, 2, 4))
    },
    **{
        f"{n} staggered in {angle}": (
            angle,
            _bolted("long leg", n, "80 mm", "40 mm", 2, "45 mm", "55 mm", "40 mm"),
        )
        for angle, n in itertools.product(("150x90x10 UA", "150x100x12 UA"), (2, 3, 5))
    },
    "short leg": ("150x90x10 UA", _bolted("short leg", 2, "80 mm", "45 mm", gauge="50 mm")),
    "both flanges": (
        "150 UC 30.0",
        _bolted("both flanges", 4, "70 mm", "40 mm", 2, spacing="90 mm"),
    ),
    "channel flanges": ("200 PFC", _bolted("both flanges", 4, "70 mm", "40 mm", gauge="45 mm")),
    "I web": ("310 UB 40.4", _bolted("web", 3, "70 mm", "40 mm", 2, spacing="140 mm")),
    "tee": ("155 BT 20.2", _bolted("flange", 3, "70 mm", "40 mm", 2, spacing="90 mm")),
    "tee stem": ("155 BT 20.2", _bolted("web", 3, "70 mm", "40 mm")),
    "flat": ("130x12 FL", _bolted("plate", 4, "80 mm", "45 mm", size="M24")),
    "welded angle": (
        "150x90x10 UA",
        tl.Welded("long leg", "6 mm", PLATE, "160 mm", "90 mm", "125 mm"),
    ),
    "welded short": ("100x100x8 EA", tl.Welded("leg", "6 mm", PLATE, "40 mm")),
    "bar": ("30 RB", tl.Welded("bar", "6 mm", PLATE, "120 mm")),
    "CHS": (
        "114.3x4.8 CHS",
        tl.Welded("slot", "5 mm", PLATE, "150 mm", slot_clearance="3 mm"),
    ),
    "RHS": (
        "150x100x6.0 RHS",
        tl.Welded("slot", "5 mm", PLATE, "400 mm", slot_clearance="3 mm"),
    ),
    "double angle": (
        "2/100x100x8 EA, legs, gap 12 mm",
        _bolted("long leg", 2, "70 mm", "35 mm", gauge="55 mm"),
    ),
    "wide gusset": (
        "100x100x10 EA",
        _bolted("leg", 3, "70 mm", "40 mm", gauge="55 mm").but(
            plate=tl.Gusset("20 mm", "AS/NZS 3678 250", "400 mm")
        ),
    ),
}


def _view(name):
    designation, end = CASES[name]
    hole = 22.0 if isinstance(end, tl.Bolted) else 0.0
    return end_view(tl.section(designation), end, FORCE, hole)


def _scene(name) -> Scene:
    return sketch_end(_view(name))


def _apart(a, b) -> bool:
    return a[2] <= b[0] + 1e-6 or b[2] <= a[0] + 1e-6 or a[3] <= b[1] + 1e-6 or b[3] <= a[1] + 1e-6


def test_there_are_many_cases():
    assert len(CASES) >= 40


@pytest.mark.parametrize("name", CASES)
def test_no_text_on_another_nor_on_a_bolt_nor_outside(name):
    scene = _scene(name)
    texts = scene.texts()
    for one, other in itertools.combinations(texts, 2):
        assert _apart(one.box(), other.box()), (one.text, other.text)
    circles = [i for i in scene.items if isinstance(i, Circle) and i.style == "bolt"]
    heads = [i for i in scene.items if isinstance(i, Line) and i.style == "force" and i.closed]
    for text in texts:
        left, top, right, bottom = text.box()
        assert left >= 0
        assert top >= 0
        assert right <= scene.width
        assert bottom <= scene.height, text.text
        for c in circles:
            assert _apart(text.box(), (c.x - c.r, c.y - c.r, c.x + c.r, c.y + c.r)), text.text
        for head in heads:
            xs, ys = zip(*head.points, strict=True)
            assert _apart(text.box(), (min(xs), min(ys), max(xs), max(ys))), text.text


@pytest.mark.parametrize("name", CASES)
def test_the_force_stands_clear_of_the_section(name):
    scene = _scene(name)
    label = next(text for text in scene.texts() if text.text == FORCE)
    curves = [i for i in scene.items if isinstance(i, Curve)]
    for curve in curves:
        assert label.box()[2] < min(step[0] for step in curve.steps)


@pytest.mark.parametrize("name", CASES)
def test_no_text_on_a_member_edge(name):
    scene = _scene(name)
    member = next(i for i in scene.items if isinstance(i, Line) and i.style == "member")
    ys = sorted({y for _, y in member.points})
    xs = [x for x, _ in member.points]
    for text in scene.texts():
        left, top, right, bottom = text.box()
        if right <= min(xs) or left >= max(xs):
            continue
        assert not any(top < y < bottom for y in ys), text.text


@pytest.mark.parametrize("name", CASES)
def test_bolts_and_dimensions_are_to_scale(name):
    view, scene = _view(name), _scene(name)
    member = next(i for i in scene.items if isinstance(i, Line) and i.style == "member")
    ys = [y for _, y in member.points]
    scale = (max(ys) - min(ys)) / view.width
    for chain in scene.items:
        if isinstance(chain, Chain):
            for a, b, text in zip(chain.stops, chain.stops[1:], chain.texts, strict=False):
                assert (b - a) / scale == pytest.approx(float(text.text), rel=1e-4)
    holes = [c for c in scene.items if isinstance(c, Circle) and c.style == "bolt"]
    for circle, (x, y) in zip(holes, view.holes, strict=False):
        assert circle.r / scale == pytest.approx(view.hole / 2)
        assert (circle.x - min(px for px, _ in member.points)) / scale == pytest.approx(x)
        assert (max(ys) - circle.y) / scale == pytest.approx(y)


@pytest.mark.parametrize("name", CASES)
def test_svg_is_sound_and_repeats(name):
    scene = _scene(name)
    svg = to_svg(scene)
    assert svg == to_svg(_scene(name))
    root = ET.fromstring(svg)
    texts = [e.text for e in root.iter("{http://www.w3.org/2000/svg}text")]
    assert FORCE in texts
    assert "Section" in texts
    assert "nan" not in svg
    # Legible when the drawing is 80 mm wide.
    assert TEXT_HEIGHT * 80.0 / scene.width >= 2.2
    alt = describe(_view(name))
    assert FORCE in alt
    assert tl.section(CASES[name][0]).designation in alt


def test_hostile_force_label_is_escaped():
    designation, end = CASES["short leg"]
    view = end_view(tl.section(designation), end, '<script>&"', 26.0)
    svg = to_svg(sketch_end(view))
    assert "<script>" not in svg
    assert "&lt;script&gt;&amp;" in svg


def test_spread_keeps_order_and_gaps():
    places = spread([5.0, 5.1, 5.2, 30.0], [4.0, 4.0, 4.0, 4.0], 1.0)
    assert places == sorted(places)
    for a, b in itertools.pairwise(places):
        assert b - a >= 5.0 - 1e-9
    assert places[3] == 30.0
    assert sum(places[:3]) / 3 == pytest.approx(5.1)


def test_text_width_is_on_the_safe_side():
    """No narrower than what DejaVu Sans sets at this height, taken from its advance widths."""
    # Units per em 2048: N 1532, * 1024, blank 651, = 1716, digits 1303, point 651, k 1186.
    em = (1532 + 1024 + 651 + 1716 + 651 + 4 * 1303 + 651 + 651 + 1186 + 1532) / 2048
    assert text_width(FORCE) >= 0.97 * em * TEXT_HEIGHT
