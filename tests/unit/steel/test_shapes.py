"""Shapes: textbook closed forms, and the dimensions that make no shape."""

from __future__ import annotations

from math import pi, sqrt

import pytest

from tensionlib.errors import InputError, UnitError
from tensionlib.steel import by_dimensions, double, section, stated


def made(shape, **dims):
    return by_dimensions(shape, **{name: f"{value} mm" for name, value in dims.items()})


def test_rectangle():
    s = made("flat", b=120, t=10)
    assert s.A == pytest.approx(1200)
    assert s.I_x == pytest.approx(120 * 10**3 / 12)
    assert s.I_y == pytest.approx(10 * 120**3 / 12)
    assert s.r_min == pytest.approx(10 / sqrt(12))


def test_round_bar():
    s = made("round", d=36)
    assert s.A == pytest.approx(pi * 36**2 / 4)
    assert s.I_x == pytest.approx(pi * 36**4 / 64)
    assert s.r_min == pytest.approx(36 / 4)


def test_round_tube():
    s = made("CHS", d=168.3, t=6.4)
    inner = 168.3 - 12.8
    assert s.A == pytest.approx(pi / 4 * (168.3**2 - inner**2))
    assert s.I_y == pytest.approx(pi / 64 * (168.3**4 - inner**4))


def test_sharp_tube():
    s = made("RHS", d=200, b=100, t=6)
    assert s.A == pytest.approx(200 * 100 - 188 * 88)
    assert s.I_x == pytest.approx((100 * 200**3 - 88 * 188**3) / 12)
    assert s.I_y == pytest.approx((200 * 100**3 - 188 * 88**3) / 12)


def test_sharp_i():
    s = made("I", d=300, b_f=150, t_f=12, t_w=8)
    assert s.A == pytest.approx(2 * 150 * 12 + 276 * 8)
    assert s.I_x == pytest.approx((150 * 300**3 - 142 * 276**3) / 12)
    assert s.I_y == pytest.approx((2 * 12 * 150**3 + 276 * 8**3) / 12)
    assert (s.x_c, s.y_c) == pytest.approx((0, 150))


def test_sharp_tee_by_the_parallel_axis_rule():
    s = made("tee", d=150, b_f=160, t_f=10, t_w=6)
    flange, stem = 160 * 10, 140 * 6
    y = (flange * 145 + stem * 70) / (flange + stem)
    assert s.y_c == pytest.approx(y)
    assert s.I_x == pytest.approx(
        160 * 10**3 / 12 + flange * (145 - y) ** 2 + 6 * 140**3 / 12 + stem * (y - 70) ** 2
    )


def test_sharp_channel_by_the_parallel_axis_rule():
    s = made("channel", d=200, b_f=80, t_f=12, t_w=6)
    flanges, web = 2 * 80 * 12, 176 * 6
    x = (flanges * 40 + web * 3) / (flanges + web)
    assert s.x_c == pytest.approx(x)
    assert s.I_x == pytest.approx((80 * 200**3 - 74 * 176**3) / 12)
    assert s.I_y == pytest.approx(
        2 * 12 * 80**3 / 12 + flanges * (40 - x) ** 2 + 176 * 6**3 / 12 + web * (x - 3) ** 2
    )


def test_sharp_equal_angle():
    """Its minor principal axis is at 45 degrees: I_min = I_x − |I_xy|."""
    s = made("angle", b1=100, b2=100, t=10)
    long, short = 100 * 10, 90 * 10
    c = (long * 50 + short * 5) / (long + short)
    assert (s.x_c, s.y_c) == pytest.approx((c, c))
    I_x = 10 * 100**3 / 12 + long * (50 - c) ** 2 + 90 * 10**3 / 12 + short * (c - 5) ** 2
    I_xy = long * (5 - c) * (50 - c) + short * (55 - c) * (5 - c)
    assert s.I_x == pytest.approx(I_x)
    assert s.r_min == pytest.approx(sqrt((I_x - abs(I_xy)) / s.A))


@pytest.mark.parametrize("gap", [0.0, 10.0, 16.0])
def test_two_channels_by_the_parallel_axis_rule(gap):
    one = section("200 PFC")
    pair = double("200 PFC", f"{gap} mm", "web")
    I_y = 2 * (one.I_y + one.A * (one.x_c + gap / 2) ** 2)
    assert (pair.A, pair.mass, pair.I_x) == pytest.approx((2 * one.A, 2 * one.mass, 2 * one.I_x))
    assert pair.I_y == pytest.approx(I_y)
    assert pair.r_min == pytest.approx(sqrt(min(2 * one.I_x, I_y) / pair.A))


ROOM = {
    "angle": {"b1": 125, "b2": 75, "t": 10, "r1": 8, "r2": 5},
    "channel": {"d": 150, "b_f": 75, "t_f": 10, "t_w": 6, "r1": 10, "r2": 2},
    "I": {"d": 200, "b_f": 130, "t_f": 10, "t_w": 6, "r1": 9},
    "tee": {"d": 100, "b_f": 130, "t_f": 10, "t_w": 6, "r1": 9},
    "flat": {"b": 100, "t": 10},
    "CHS": {"d": 100, "t": 5},
    "RHS": {"d": 150, "b": 100, "t": 6, "r_ext": 15},
}


@pytest.mark.parametrize(
    ("shape", "name", "value", "says"),
    [
        ("angle", "b2", 126, "the long leg b1"),
        ("angle", "t", 75, "the short leg"),
        ("angle", "r2", 10.1, "the thickness"),
        ("angle", "r1", 60.1, "what the short leg leaves"),
        ("channel", "t_w", 75, "the flange width"),
        ("channel", "t_f", 75, "half the depth"),
        ("channel", "r2", 10.1, "the flange thickness"),
        ("channel", "r1", 67.1, "what the flange leaves"),
        ("I", "t_w", 130, "the flange width"),
        ("I", "t_f", 100, "half the depth"),
        ("I", "r1", 62.1, "what the flange leaves"),
        ("tee", "t_f", 100, "the depth"),
        ("tee", "r1", 62.1, "what the flange leaves"),
        ("flat", "t", 101, "the width"),
        ("CHS", "t", 50, "the radius"),
        ("RHS", "t", 50, "half the smaller side"),
        ("RHS", "r_ext", 50.1, "half the smaller side"),
        ("RHS", "d", 0, "more than zero is due"),
    ],
)
def test_dimensions_that_make_no_shape(shape, name, value, says):
    made(shape, **ROOM[shape])
    with pytest.raises(InputError, match=f"{name}: got {value} mm; .*{says}"):
        made(shape, **ROOM[shape] | {name: value})


@pytest.mark.parametrize(
    ("shape", "dims", "r1"),
    [
        ("channel", {"d": 150, "b_f": 175, "t_f": 10, "t_w": 6}, 65),
        ("I", {"d": 150, "b_f": 330, "t_f": 10, "t_w": 6}, 65),
        ("tee", {"d": 75, "b_f": 330, "t_f": 10, "t_w": 6}, 65),
    ],
)
def test_root_fillets_do_not_run_into_each_other_on_the_web(shape, dims, r1):
    """A web of 130 mm clear has room for two fillets of 65 mm, a stem of 65 mm for one."""
    fillets = {"channel": 2, "I": 4, "tee": 2}[shape]
    sharp = made(shape, **dims).A
    assert made(shape, **dims, r1=r1).A == pytest.approx(sharp + fillets * (1 - pi / 4) * r1**2)
    with pytest.raises(InputError, match=f"r1: got {r1 + 1} mm; less than {r1} mm"):
        made(shape, **dims, r1=r1 + 1)


def test_stated_sections_are_asked_for_their_source_and_units():
    with pytest.raises(InputError, match="source: missing"):
        stated("tie", A="2000 mm2", t="10 mm", source=" ")
    with pytest.raises(UnitError, match="t: got '10 kN', a force"):
        stated("tie", A="2000 mm2", t="10 kN", source="calculation 3")
    with pytest.raises(InputError, match="A: got 0 mm²; it must be above"):
        stated("tie", A="0 mm2", t="10 mm", source="calculation 3")
    with pytest.raises(InputError, match="no single shape with dimensions"):
        stated("tie", A="2000 mm2", t="10 mm", source="calculation 3").outline()


def test_stated_section_keeps_what_it_was_given():
    s = stated("tie", A="20 cm2", t="1/2 in", r_min="20 mm", source="calculation 3")
    assert (s.A, s.thickness("plate"), s.r_min) == (2000.0, 12.7, 20.0)
    assert s.mass == pytest.approx(2000 * 7.85e-3)
    assert (s.I_x, s.r_x, s.r_y) == (None, None, None)
    with pytest.raises(InputError, match="b: tie states no b"):
        s.leg("plate")
