"""A gusset's own outline: rays, the width that counts, strips, supports; by hand."""

from __future__ import annotations

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from tensionlib.errors import InputError, UnitError
from tensionlib.joints.blocks import Form, least_block
from tensionlib.joints.gusset_shape import GussetPart, GussetShape
from tensionlib.joints.parts import Flat, Opening
from tensionlib.quantities import ANGLE, LENGTH, quantity

TAN_30 = math.tan(math.pi / 6)


def shape(corners, supported=(3,), at=(100, 150), angle="0 deg"):
    return GussetShape(
        [(f"{x} mm", f"{y} mm") for x, y in corners],
        supported,
        (f"{at[0]} mm", f"{at[1]} mm"),
        angle,
    )


# 400 long, 300 wide, held along its left edge; the member's end 100 from it, in the middle.
RECTANGLE = ((0, 0), (400, 0), (400, 300), (0, 300))


def test_rays_and_edges_of_a_rectangle():
    gusset = shape(RECTANGLE)
    assert gusset.ray(0.0, 0.0, 1.0, 0.0).distance == pytest.approx(300.0)
    assert gusset.ray(0.0, 0.0, -1.0, 0.0).distance == pytest.approx(100.0)
    assert gusset.ray(50.0, 20.0, 0.0, 1.0).distance == pytest.approx(130.0)
    assert [length for _, length in gusset.free_edges()] == pytest.approx([400, 300, 400])


def test_a_spread_inside_is_not_cut():
    width = shape(RECTANGLE).width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert width.width == pytest.approx(2 * 140 * TAN_30)
    assert (width.cut_low, width.cut_high) == ("", "")


def test_a_free_edge_cuts_the_spread():
    """The line 60 from the lower edge: 140·tan 30° = 80.8 is cut to 60 on that side."""
    gusset = shape(RECTANGLE, at=(100, 60))
    width = gusset.width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert width.low == pytest.approx(-60.0)
    assert width.high == pytest.approx(140 * TAN_30)
    assert (width.cut_low, width.cut_high) == ("free edge", "")


def test_a_support_beside_the_joint_interrupts_the_spread():
    gusset = shape(RECTANGLE, supported=(0,), at=(100, 60))
    width = gusset.width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert width.low == pytest.approx(-60.0)
    assert width.cut_low == "support"


def test_a_notch_cuts_the_ray_before_the_line_does():
    """A notch 30 deep from the line at u = 100..120: the ray runs out through it there."""
    corners = (
        (0, 0),
        (200, 0),
        (200, 120),
        (220, 120),
        (220, 0),
        (400, 0),
        (400, 300),
        (0, 300),
    )
    gusset = shape(corners, supported=(7,), at=(100, 150))
    width = gusset.width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    # From (180, 0) at 30° down: at u = 120, the far side of the notch, v = -34.6: under -30.
    assert width.low == pytest.approx(-60 * TAN_30)
    assert width.cut_low == "free edge"
    assert width.high == pytest.approx(140 * TAN_30)


def test_strips_run_back_to_the_support_or_to_nothing():
    gusset = shape(RECTANGLE)
    width = gusset.width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert gusset.strips(40.0, width) == pytest.approx((140.0, 140.0, 140.0))
    free = shape(RECTANGLE, supported=(1,))
    assert free.strips(40.0, width) == (None, None, None)


def test_what_a_unit_tension_puts_on_the_support():
    """Left edge, 300 long: the force is square to it, its line in the middle or 90 off it."""
    (run,) = shape(RECTANGLE).support_runs()
    assert (run.length, run.along, run.square, run.lever) == pytest.approx((300, 0, 1, 0))
    (off,) = shape(RECTANGLE, at=(100, 60)).support_runs()
    assert off.lever == pytest.approx(90.0)
    (slanted,) = shape(RECTANGLE, supported=(0,), angle="30 deg").support_runs()
    assert slanted.along == pytest.approx(math.cos(math.pi / 6))
    assert slanted.square == pytest.approx(0.5)


def test_the_lever_turns_the_force_about_the_edge():
    """Bottom edge, member at 30° through (100, 150): moment about the edge's middle by hand."""
    (run,) = shape(RECTANGLE, supported=(0,), angle="30 deg").support_runs()
    by_hand = abs((200 - 100) * math.sin(math.pi / 6) - (0 - 150) * math.cos(math.pi / 6))
    assert run.lever == pytest.approx(by_hand)


@settings(max_examples=200, deadline=None, derandomize=True)
@given(turn=st.floats(-3.0, 3.0), x=st.integers(-500, 500), y=st.integers(-500, 500))
def test_turning_and_moving_everything_changes_nothing(turn, x, y):
    cos, sin = math.cos(turn), math.sin(turn)

    def moved(px, py):
        return tuple(
            quantity(v, LENGTH) for v in (px * cos - py * sin + x, px * sin + py * cos + y)
        )

    corners = ((0, 0), (420, 0), (420, 150), (250, 330), (0, 330))
    plain = shape(corners, supported=(0,), at=(150, 100), angle="40 deg")
    turned = GussetShape(
        [moved(*c) for c in corners],
        (0,),
        moved(150, 100),
        quantity(math.radians(40) + turn, ANGLE),
    )
    starts = [(40.0, -30.0), (180.0, 30.0)]
    a, b = plain.width(starts, 40.0), turned.width(starts, 40.0)
    assert (a.low, a.high) == pytest.approx((b.low, b.high), abs=1e-6)
    assert plain.strips(40.0, a)[1] == pytest.approx(turned.strips(40.0, b)[1], abs=1e-6)


def test_as_a_part_it_finds_the_blocks_of_the_same_flat_plate():
    """The rectangle as a gusset and as a flat part, holes in the same places."""
    gusset = shape(RECTANGLE)
    part = GussetPart(gusset, 12.0, 300.0)
    places = [(40.0, -30.0), (110.0, -30.0), (180.0, -30.0), (40.0, 30.0), (180.0, 30.0)]
    holes = [Opening.round(str(i), *part.to_part(u, v), 22.0) for i, (u, v) in enumerate(places)]
    flat = Flat.plain(300.0, 12.0)
    forms = (Form(0.0, 246.0, 0.0, 410.0), Form(156.0, 0.0, 0.0, 410.0))
    one, other = least_block(part, holes, forms), least_block(flat, holes, forms)
    assert one.capacity(forms) == pytest.approx(other.capacity(forms))
    assert one.marks == other.marks


@pytest.mark.parametrize(
    ("attempt", "error", "says"),
    [
        (lambda: shape(RECTANGLE[:2]), InputError, "corners: got 2; three or more"),
        (lambda: shape(RECTANGLE, supported=(4,)), InputError, "supported: got 4; edges are"),
        (lambda: shape(RECTANGLE, at=(500, 10)), InputError, "member_at: .* outside"),
        (
            lambda: shape(((0, 0), (400, 300), (400, 0), (0, 300))),
            InputError,
            "corners: two edges cross",
        ),
        (
            lambda: GussetShape([(0, 0), (1, 0), (0, 1)], (), ("1 mm", "1 mm"), "0 deg"),
            UnitError,
            "corner 0",
        ),
    ],
)
def test_refused(attempt, error, says):
    with pytest.raises(error, match=says):
        attempt()
