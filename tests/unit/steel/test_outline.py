"""Outlines of any dimensions: against a polygon library, and what moving and turning must keep."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st
from shapely.geometry import Polygon

from tensionlib.steel import shapes
from tensionlib.steel.outline import Arc, Circle, Corner, Outline, Properties, edges

PIECES = 720  # an arc as this many chords a full turn


def lengths(least, most):
    return st.floats(least, most).map(lambda x: round(x, 1))


@st.composite
def made(draw):
    """A shape name and dimensions that make it, fillets and toes from none to all there is room."""
    shape = draw(st.sampled_from(["angle", "channel", "I", "tee", "flat", "round", "CHS", "RHS"]))
    share = st.integers(0, 100).map(lambda percent: percent / 100)
    if shape == "angle":
        b1, t = draw(lengths(40, 250)), draw(lengths(3, 20))
        b2 = draw(lengths(40, 250).filter(lambda b: t + 15 < b <= b1))
        r2 = draw(share) * t
        return shape, {"b1": b1, "b2": b2, "t": t, "r2": r2, "r1": draw(share) * (b2 - t - r2)}
    if shape in ("channel", "I", "tee"):
        d, b_f = draw(lengths(60, 600)), draw(lengths(60, 300))
        t_f, t_w = draw(lengths(4, 25)), draw(lengths(3, 25))
        dims = {"d": d, "b_f": b_f, "t_f": t_f, "t_w": t_w}
        if shape == "channel":
            dims["r2"] = draw(share) * t_f
            room = min(b_f - t_w - dims["r2"], d / 2 - t_f)
        else:
            room = min((b_f - t_w) / 2, d - t_f if shape == "tee" else d / 2 - t_f)
        return shape, dims | {"r1": draw(share) * room}
    if shape == "flat":
        return shape, {"b": draw(lengths(30, 300)), "t": draw(lengths(3, 25))}
    if shape == "round":
        return shape, {"d": draw(lengths(8, 100))}
    d, t = draw(lengths(40, 500)), draw(lengths(2, 16))
    if shape == "CHS":
        return shape, {"d": d, "t": t}
    b = draw(lengths(40, 300))
    return shape, {"d": d, "b": b, "t": t, "r_ext": draw(share) * min(b, d) / 2}


def points(loop):
    """The loop as points, arcs as fine chords, walked from the centre and sweep of each arc."""
    if isinstance(loop, Circle):
        turns = [2 * math.pi * i / PIECES for i in range(PIECES)]
        return [(loop.cx + loop.r * math.cos(a), loop.cy + loop.r * math.sin(a)) for a in turns]
    out = []
    for edge in edges(loop):
        if not isinstance(edge, Arc):
            out += [edge[:2], edge[2:]]
            continue
        start = math.atan2(edge.y1 - edge.cy, edge.x1 - edge.cx)
        n = max(8, round(PIECES * abs(edge.sweep) / (2 * math.pi)))
        for i in range(n + 1):
            a = start + edge.sweep * i / n
            out.append((edge.cx + edge.r * math.cos(a), edge.cy + edge.r * math.sin(a)))
    return out


def between_arcs_and_chords(loop):
    """A bound of the area between the arcs and their chords: r² sweep δ²/12, a tenth more."""
    share = 1.1 * (2 * math.pi / PIECES) ** 2 / 12
    if isinstance(loop, Circle):
        return share * loop.r**2 * 2 * math.pi
    return sum(share * e.r**2 * abs(e.sweep) for e in edges(loop) if isinstance(e, Arc))


def turned(loop, angle, dx, dy, size=1.0):
    c, s = size * math.cos(angle), size * math.sin(angle)

    def place(x, y):
        return c * x - s * y + dx, s * x + c * y + dy

    if isinstance(loop, Circle):
        return Circle(*place(loop.cx, loop.cy), size * loop.r)
    return tuple(Corner(*place(k.x, k.y), size * k.r) for k in loop)


def changed(shape, *args):
    return Outline(turned(shape.outer, *args), tuple(turned(h, *args) for h in shape.holes))


def of(shape):
    return Properties.of(shape.moments())


@given(made())
def test_area_and_centroid_are_those_of_a_fine_polygon(drawn):
    shape = shapes.outline(*drawn)
    polygon = Polygon(points(shape.outer), [points(hole) for hole in shape.holes])
    assert polygon.buffer(0).area == pytest.approx(polygon.area, rel=1e-9)  # does not cross itself
    p = of(shape)
    missing = sum(map(between_arcs_and_chords, (shape.outer, *shape.holes))) + 1e-9 * p.A
    assert p.A == pytest.approx(polygon.area, abs=missing)
    shift = missing / p.A * 2 * max(drawn[1].values())
    assert p.x_c == pytest.approx(polygon.centroid.x, abs=shift)
    assert p.y_c == pytest.approx(polygon.centroid.y, abs=shift)


@given(made(), st.floats(0.0, 2 * math.pi), st.floats(-500, 500), st.floats(-500, 500))
def test_turning_and_moving_keeps_area_polar_moment_and_least_radius(drawn, angle, dx, dy):
    shape = shapes.outline(*drawn)
    p, q = of(shape), of(changed(shape, angle, dx, dy))
    assert q.A == pytest.approx(p.A, rel=1e-9)
    assert q.I_x + q.I_y == pytest.approx(p.I_x + p.I_y, rel=1e-7)
    assert q.r_min == pytest.approx(p.r_min, rel=1e-6)
    (centroid,) = turned((Corner(p.x_c, p.y_c),), angle, dx, dy)
    assert (q.x_c, q.y_c) == pytest.approx((centroid.x, centroid.y), abs=1e-6)


@given(made(), st.floats(0.1, 20.0))
def test_scaling(drawn, size):
    shape = shapes.outline(*drawn)
    p, q = of(shape), of(changed(shape, 0.0, 0.0, 0.0, size))
    assert q.A == pytest.approx(size**2 * p.A, rel=1e-9)
    assert q.I_x == pytest.approx(size**4 * p.I_x, rel=1e-9)
    assert q.r_min == pytest.approx(size * p.r_min, rel=1e-7)


@given(made())
def test_second_moments_are_sound(drawn):
    """Least radius below both others; the product zero for all but angles; positive area."""
    p = of(shapes.outline(*drawn))
    assert p.A > 0.0
    assert p.I_x * p.I_y > p.I_xy**2
    assert p.r_min <= min(math.sqrt(p.I_x / p.A), math.sqrt(p.I_y / p.A)) * (1 + 1e-9)
    if drawn[0] != "angle":
        assert p.I_xy == pytest.approx(0.0, abs=1e-9 * (p.I_x + p.I_y))
    else:
        assert p.I_xy < 0.0
