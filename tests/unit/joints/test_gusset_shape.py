"""A gusset's own outline: rays, the width that counts, strips, supports; by hand."""

from __future__ import annotations

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from tensionlib.errors import InputError, UnitError
from tensionlib.joints.blocks import Form, least_block
from tensionlib.joints.gusset_shape import GussetPart, GussetShape
from tensionlib.joints.parts import Flat, Opening, check_holes
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


def notched(u_1, u_2, depth):
    """The rectangle with a notch in its lower edge from u_1 to u_2, up to `depth` below v = 0."""
    x_1, x_2, y = u_1 + 100, u_2 + 100, 150 - depth
    corners = ((0, 0), (x_1, 0), (x_1, y), (x_2, y), (x_2, 0), (400, 0), (400, 300), (0, 300))
    return shape(corners, supported=(7,))


def test_a_notch_leaves_the_spread_no_more_than_stands_above_it():
    """A notch up to 30 below the line at u = 100..120. The ray from (180, 0) meets it at u = 120,
    34.6 down, and the plate is whole again at u = 40; but 30 is all that the force passes by."""
    width = notched(100, 120, 30).width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert width.low == pytest.approx(-30.0)
    assert width.cut_low == "free edge"
    assert width.high == pytest.approx(140 * TAN_30)


def test_a_long_notch_leaves_nothing_behind_it():
    """A notch nearly to the line and nearly to the last bolt: the plate that stands behind it at
    u = 40 has no force to take."""
    width = notched(45, 120, 1).width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert width.low == pytest.approx(-1.0)


def test_a_notch_outside_the_spread_cuts_nothing():
    """At u = 100..120 the spread is 34.6 to 46.2 wide below the line; a notch up to 47 is clear of
    it, and so is a deep one beyond the first bolt."""
    for gusset in (notched(100, 120, 47), notched(185, 220, 5)):
        width = gusset.width([(40.0, 0.0), (180.0, 0.0)], 40.0)
        assert (width.low, width.cut_low) == (pytest.approx(-140 * TAN_30), "")


def test_the_line_across_is_of_the_piece_the_joint_is_in():
    """At u = 0 a slot from v = 60 to 80, open to the left, parts the joint from the plate above
    it; its end is at u = 20, outside the spread from (100, 0), which is 46.2 there."""
    corners = ((0, 0), (400, 0), (400, 300), (0, 300), (0, 230), (120, 230), (120, 210), (0, 210))
    gusset = shape(corners, supported=(7,))
    assert gusset.width([(0.0, 0.0), (100.0, 0.0)], 0.0).cut_high == ""
    width = gusset.width([(0.0, 0.0), (200.0, 0.0)], 0.0)
    assert width.high == pytest.approx(60.0)
    assert width.low == pytest.approx(-200 * TAN_30)


def test_a_slot_for_a_bar_takes_nothing_from_the_spread():
    """A slot 24 wide from the right to u = 20, between two lines of weld 30 either side of it: the
    force spreads outwards from them, the slot is between."""
    slot = ((400, 138), (120, 138), (120, 162), (400, 162))
    gusset = shape(((0, 0), (400, 0), *slot, (400, 300), (0, 300)), supported=(7,))
    width = gusset.width([(0.0, -30.0), (0.0, 30.0), (180.0, -30.0), (180.0, 30.0)], 0.0)
    assert width.width == pytest.approx(60 + 2 * 180 * TAN_30)
    assert (width.cut_low, width.cut_high) == ("", "")


def test_a_bolt_whose_line_leaves_the_plate_spreads_towards_the_joint():
    """Bolts at (0, 20) and (100, 50) under an edge that rises from v = 25 at u = 0 to v = 60 at
    u = 100: the plate ends at 25 on the line across; the lower side is the far bolt's, whole."""
    gusset = shape(((0, 0), (400, 0), (400, 280), (0, 140)), supported=(3,))
    width = gusset.width([(0.0, 20.0), (100.0, 50.0)], 0.0)
    assert (width.low, width.high) == pytest.approx((50 - 100 * TAN_30, 25.0))
    assert (width.cut_low, width.cut_high) == ("", "free edge")


def test_a_far_bolt_cut_off_from_the_joint_is_refused():
    """Bolts at (0, 0) and (200, 40), which governs both sides. A wedge comes down between them to
    (100, -10) and leaves the lower side only what is above v = 20.6, where its right flank, from
    there to (115, 150), meets the way to the middle, v = u/5; the plate at u = 0 ends at 15."""
    wedge = ((215, 300), (200, 140), (185, 165))
    gusset = shape(((0, 0), (400, 0), (400, 300), *wedge, (0, 165)), supported=(6,))
    with pytest.raises(InputError, match="leaves no width for the force at u = 0 mm"):
        gusset.width([(0.0, 0.0), (200.0, 40.0)], 0.0)


def test_a_clipped_corner_cuts_the_line_across():
    """The upper left corner cut off from (0, 200) to (100, 300) in the gusset's axes, the member's
    end at (20, 150): the line at u = 0 meets the cut at v = 70, and 200·tan 30° is 115.5. The
    spread meets it where v = 70 + u = (200 - u)·tan 30°, above that."""
    corners = ((0, 0), (400, 0), (400, 300), (100, 300), (0, 200))
    gusset = shape(corners, supported=(4,), at=(20, 150))
    width = gusset.width([(0.0, 0.0), (200.0, 0.0)], 0.0)
    assert width.high == pytest.approx(70.0)
    assert width.cut_high == "free edge"
    assert width.low == pytest.approx(-200 * TAN_30)


def test_a_spread_from_weld_that_runs_up_to_the_edge():
    """Welds 90 apart from the member's end to the gusset's free end 300 farther: that end does not
    stop the spread it begins at, the sides do, 150 from the line."""
    starts = [(0.0, -45.0), (0.0, 45.0), (300.0, -45.0), (300.0, 45.0)]
    width = shape(RECTANGLE).width(starts, 0.0)
    assert (width.low, width.high) == pytest.approx((-150.0, 150.0))
    narrow = [(u, v) for u, v in starts if u == 0.0] + [(150.0, -45.0), (150.0, 45.0)]
    assert shape(RECTANGLE).width(narrow, 0.0).width == pytest.approx(90 + 2 * 150 * TAN_30)


def test_a_member_at_45_degrees_in_the_corner_of_beam_and_column():
    """300 square, held along the left and the lower edge, the member's end at (60, 60): the line
    through u = 0 is the diagonal x + y = 120, and its ends are 60√2 away on the supports."""
    gusset = shape(
        ((0, 0), (300, 0), (300, 300), (0, 300)), supported=(0, 3), at=(60, 60), angle="45 deg"
    )
    width = gusset.width([(0.0, 0.0), (150.0, 0.0)], 0.0)
    assert width.width == pytest.approx(2 * 60 * math.sqrt(2))
    assert (width.cut_low, width.cut_high) == ("support", "support")
    # At the ends of that width the supports are there at once; in the middle is their corner.
    assert gusset.strips(0.0, width) == pytest.approx((0.0, 60 * math.sqrt(2), 0.0), abs=1e-5)
    lower, left = gusset.support_runs()
    assert (lower.edge, left.edge) == (0, 3)
    for run in (lower, left):
        assert (run.length, run.along, run.square) == pytest.approx((300, 0.5**0.5, 0.5**0.5))
        # From the middle of either edge to the line of force: 150·sin 45°.
        assert run.lever == pytest.approx(150 * 0.5**0.5)
    assert gusset.ray(0.0, 0.0, 1.0, 0.0).distance == pytest.approx(240 * math.sqrt(2))


# A notch whose tip is below the line v = 0, on it, and over it: there its left flank, from
# (150, 0) to (200, 101), is at y = 100 where x = 150 + 50·100/101.
@pytest.mark.parametrize(("tip", "distance"), [(99, 300.0), (100, 300.0), (101, 50 + 5000 / 101)])
def test_a_ray_goes_on_past_a_corner_it_only_touches(tip, distance):
    corners = ((0, 0), (150, 0), (200, tip), (250, 0), (400, 0), (400, 300), (0, 300))
    gusset = shape(corners, supported=(6,), at=(100, 100))
    assert gusset.ray(0.0, 0.0, 1.0, 0.0).distance == pytest.approx(distance)


def test_a_ray_that_leaves_in_the_corner_of_a_support_leaves_through_the_free_edge():
    gusset = shape(RECTANGLE, at=(100, 100))
    hit = gusset.ray(0.0, 0.0, -math.sqrt(0.5), -math.sqrt(0.5))
    assert hit.distance == pytest.approx(100 * math.sqrt(2))
    assert hit.edge == 0


def test_a_ray_from_an_edge_goes_into_the_gusset_or_nowhere():
    gusset = shape(RECTANGLE)
    assert gusset.ray(300.0, 0.0, -1.0, 0.0).distance == pytest.approx(400.0)
    assert gusset.ray(300.0, 0.0, 1.0, 0.0).distance == 0.0
    assert gusset.ray(0.0, 150.0, 1.0, 0.0).distance == pytest.approx(300.0)


def test_edges_that_go_straight_on_are_one_free_edge():
    """The lower edge in three pieces, the corners counted from the middle of it; then its middle
    piece held."""
    corners = ((150, 0), (250, 0), (400, 0), (400, 300), (0, 300), (0, 0))
    whole = dict(shape(corners, supported=(4,)).free_edges())
    assert whole == pytest.approx({5: 400.0, 2: 300.0, 3: 400.0})
    held = dict(shape(corners, supported=(0,)).free_edges())
    assert held == pytest.approx({1: 150.0, 2: 300.0, 3: 400.0, 4: 300.0, 5: 150.0})


def test_edge_distance_is_square_to_an_edge_askew():
    """The corner cut off along x + y = 550: from (300, 200) it is 50/√2 away, 50 along the axes;
    the right edge is 100 away, and where it is the only free one 100 counts."""
    corners = ((0, 0), (400, 0), (400, 150), (250, 300), (0, 300))
    gusset = shape(corners, supported=(4,), at=(300, 200))
    assert gusset.ray(0.0, 0.0, 0.0, 1.0).distance == pytest.approx(50.0)
    assert gusset.edge_distance(0.0, 0.0) == pytest.approx(50 / math.sqrt(2))
    held = shape(corners, supported=(0, 2, 3, 4), at=(300, 100))
    assert held.edge_distance(0.0, 0.0) == pytest.approx(100.0)
    assert shape(RECTANGLE, supported=(0, 1, 2, 3)).edge_distance(0.0, 0.0) == math.inf


def test_a_hole_in_an_opening_of_the_outline_is_refused():
    """A pocket from x = 150 to 300 under a lip: from a point in it the outline is met on every
    side that a search looks to."""
    pocket = ((260, 300), (260, 280), (300, 280), (300, 200), (150, 200), (150, 280), (200, 280))
    corners = ((0, 0), (400, 0), (400, 300), *pocket, (200, 300), (0, 300))
    part = GussetPart(shape(corners, supported=(11,), at=(60, 100)), 12.0, 1e4)
    inside = Opening.round("A", *part.to_part(100.0, 40.0), 22.0)
    check_holes(part, [inside])
    with pytest.raises(InputError, match=r"the point \(100, 140\) mm is not on it"):
        check_holes(part, [Opening.round("B", *part.to_part(100.0, 140.0), 22.0)])


def test_the_part_sees_supported_edges_as_no_edges():
    part = GussetPart(shape(RECTANGLE, supported=(0, 1)), 12.0, 500.0)
    assert part.width == pytest.approx(300.0)
    assert part.to_part(0.0, 0.0) == pytest.approx((500.0, 150.0))
    x, y = part.to_part(50.0, 20.0)
    assert (x, y) == pytest.approx((450.0, 170.0))
    assert part.to_high(x, y) == pytest.approx(130.0)
    assert (part.to_low(x, y), part.to_end(x, y)) == (math.inf, math.inf)


def test_strips_run_back_to_the_support_or_to_nothing():
    gusset = shape(RECTANGLE)
    width = gusset.width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert gusset.strips(40.0, width) == pytest.approx((140.0, 140.0, 140.0))
    # The spread cut by the lower edge: that end of it runs along the edge to the support.
    low = shape(RECTANGLE, at=(100, 60))
    cut = low.width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert low.strips(40.0, cut) == pytest.approx((140.0, 140.0, 140.0))
    # The lower half of the left edge held only: no support behind the upper end.
    half = shape((*RECTANGLE, (0, 150)), supported=(4,), at=(100, 120))
    spread = half.width([(40.0, 0.0), (180.0, 0.0)], 40.0)
    assert half.strips(40.0, spread) == (pytest.approx(140.0), pytest.approx(140.0), None)
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
        (lambda: shape(RECTANGLE, supported=(True,)), InputError, "supported: got True; edges are"),
        (lambda: shape(RECTANGLE, supported=(3, 3)), InputError, "supported: edge 3 stands twice"),
        (lambda: shape(RECTANGLE, supported=3), InputError, "supported: got 3; a list or tuple"),
        (lambda: shape(RECTANGLE, at=(500, 10)), InputError, "member_at: .* outside"),
        (lambda: shape(RECTANGLE, at=(0, 150), angle="30 deg"), InputError, "member_at: .* edge"),
        (
            lambda: shape((*RECTANGLE[:2], (400, 0), *RECTANGLE[2:])),
            InputError,
            "corners: corner 2 is the same point as corner 1",
        ),
        (
            # A spike: edge 1 runs back along edge 0.
            lambda: shape(((0, 0), (400, 0), (300, 0), (300, 300), (0, 300))),
            InputError,
            "corners: two edges cross or touch, edges 0 and 1",
        ),
        (
            # A corner on an edge far from it.
            lambda: shape(((0, 0), (400, 0), (400, 300), (200, 0), (0, 300))),
            InputError,
            "corners: two edges cross or touch, edges 0 and 2",
        ),
        (
            lambda: GussetShape("square", (), ("1 mm", "1 mm"), "0 deg"),
            InputError,
            "corners: got 'square'; a list or tuple",
        ),
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
