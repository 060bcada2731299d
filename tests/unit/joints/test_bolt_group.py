"""Bolt groups and clear distances, by hand."""

from __future__ import annotations

import math

import pytest

from tensionlib.errors import InputError
from tensionlib.joints.bolt_group import (
    BoltGroup,
    Share,
    clear_distance,
    elastic_shares,
    most_loaded,
    worst_tear_out,
)
from tensionlib.joints.parts import Flat, Opening

PLATE = Flat.plain(200.0, 10.0)


def hole(mark, x, y, d=22.0, *, bolt=True):
    return Opening.round(mark, x, y, d, bolt=bolt)


# Two lines of two bolts, 70 mm along and 60 mm across: centroid (75, 80).
# I_p = 4 (35² + 30²) = 8500 mm².
FOUR = (hole("1", 40, 50), hole("2", 110, 50), hole("3", 40, 110), hole("4", 110, 110))


def test_four_bolts_with_the_force_17_mm_above_their_centroid():
    """e = -17 mm, e/I_p = -0.002: along 0.25 ± 0.06, across ∓0.07."""
    group = elastic_shares(FOUR, 97.0)
    assert (group.x_c, group.y_c, group.I_p, group.e) == (75.0, 80.0, 8500.0, -17.0)
    expected = {
        "1": (-35.0, -30.0, 0.19, 0.07),
        "2": (35.0, -30.0, 0.19, -0.07),
        "3": (-35.0, 30.0, 0.31, 0.07),
        "4": (35.0, 30.0, 0.31, -0.07),
    }
    assert [s.mark for s in group.shares] == ["1", "2", "3", "4"]
    for share in group.shares:
        x, y, along, across = expected[share.mark]
        assert (share.x, share.y) == (x, y)
        assert share.along == pytest.approx(along, rel=1e-12)
        assert share.across == pytest.approx(across, rel=1e-12)
        assert share.size == pytest.approx(math.hypot(along, across), rel=1e-12)


def test_the_bolts_nearer_the_force_take_more():
    low, high = (hole("low", 40, 50), hole("high", 40, 110))
    group = elastic_shares((low, high), 95.0)
    # Levers 45 and 15 mm of 60.
    assert [s.along for s in group.shares] == pytest.approx([0.25, 0.75], rel=1e-12)
    assert [s.across for s in group.shares] == [0.0, 0.0]


def test_a_line_of_bolts_along_an_eccentric_force_takes_its_moment_across():
    """Three bolts at 70 mm, I_p = 2·70² = 9800 mm²; the force 14 mm below: 14·70/9800 = 0.1."""
    group = elastic_shares([hole(str(i), 40 + 70 * i, 60) for i in range(3)], 46.0)
    assert group.e == 14.0
    assert [s.along for s in group.shares] == pytest.approx([1 / 3] * 3, rel=1e-12)
    assert [s.across for s in group.shares] == pytest.approx([-0.1, 0.0, 0.1], rel=1e-12)


def test_no_line_or_a_line_through_the_centroid_gives_equal_shares():
    for line in (None, 80.0, 80.0 + 1e-9):
        group = elastic_shares(FOUR, line)
        assert group.e == 0.0
        assert [(s.along, s.across) for s in group.shares] == [(0.25, 0.0)] * 4


def test_empty_holes_take_no_part():
    group = elastic_shares((*FOUR, hole("5", 180, 50, bolt=False)), 97.0)
    assert group == elastic_shares(FOUR, 97.0)


def test_one_bolt_on_the_line_takes_all_and_off_it_is_refused():
    one = hole("7", 40, 60)
    assert elastic_shares([one], 60.0).shares == (Share("7", 0.0, 0.0, 1.0, 0.0),)
    with pytest.raises(InputError, match=r"bolt '7' at y = 60 mm.*y = 61 mm.*two bolts"):
        elastic_shares([one], 61.0)


@pytest.mark.parametrize(
    ("bolts", "line", "words"),
    [
        ([], None, "bolts: none"),
        ([hole("1", 40, 60, bolt=False)], 60.0, "bolts: none"),
        ([hole("1", 40, 60), hole("2", 40, 60)], 70.0, r"all 2 stand at \(40, 60\) mm"),
        (FOUR, math.nan, "line_y: got nan"),
        (FOUR, math.inf, "line_y: got inf"),
    ],
)
def test_refused_groups(bolts, line, words):
    with pytest.raises(InputError, match=words):
        elastic_shares(bolts, line)


# The bolt that governs ----------------------------------------------------------------------


def test_the_most_loaded_bolt_and_ties_by_mark():
    # 3 and 4 are alike but for rounding, whichever comes first.
    assert most_loaded(elastic_shares(FOUR, 97.0)).mark == "3"
    assert most_loaded(elastic_shares(FOUR[::-1], 97.0)).mark == "3"
    assert most_loaded(elastic_shares(FOUR, 60.0)).mark == "1"
    ten = [hole(mark, 40 + 70 * i, 60) for i, mark in enumerate(("10", "9", "11"))]
    assert most_loaded(elastic_shares(ten, None)).mark == "9"


def test_rounding_alone_does_not_choose_the_most_loaded_bolt():
    above = Share("1", 0.0, 0.0, 0.25 * (1 + 1e-14), 0.0)
    for mark, size, chosen in (("0", 0.25, "0"), ("0", 0.2499, "1")):
        group = BoltGroup((above, Share(mark, 0.0, 0.0, size, 0.0)), 0.0, 0.0, 1.0, 0.0)
        assert most_loaded(group).mark == chosen


def test_the_worst_tear_out_weighs_force_against_length():
    group = elastic_shares(FOUR, 97.0)
    # Sizes 0.2025 and 0.3178: over 40 mm and 62 mm, 0.00506 and 0.00513 1/mm.
    assert worst_tear_out(group, {"1": 40.0, "2": 90.0, "3": 62.0, "4": 90.0}).mark == "3"
    assert worst_tear_out(group, {"1": 39.0, "2": 90.0, "3": 62.0, "4": 90.0}).mark == "1"
    assert worst_tear_out(group, {"1": 39.0, "2": 39.0, "3": 90.0, "4": math.inf}).mark == "1"


@pytest.mark.parametrize("length", [0.0, -5.0, math.nan, None])
def test_a_bolt_without_a_length_to_tear_out_is_refused(length):
    lengths = {"1": 40.0, "2": 40.0, "3": 40.0}
    if length is not None:
        lengths["4"] = length
    with pytest.raises(InputError, match=rf"a_e: {length!r} for bolt '4'"):
        worst_tear_out(elastic_shares(FOUR, None), lengths)


# Clear distance -----------------------------------------------------------------------------


def test_straight_to_the_end_and_to_the_next_hole():
    near, far = hole("1", 40, 100), hole("2", 110, 100, 26.0)
    assert clear_distance(PLATE, (near, far), near) == 40 - 11
    assert clear_distance(PLATE, (near, far), far) == 70 - 11 - 13
    assert clear_distance(PLATE, (near, far), near, direction=(1, 0)) == 70 - 11 - 13
    assert clear_distance(PLATE, (near, far), far, direction=(1, 0)) == math.inf


def test_the_length_of_the_direction_does_not_count():
    bolt = hole("1", 40, 100)
    short, long = ((-0.3 * k, 0.4 * k) for k in (1e-6, 1e6))
    at_rest = clear_distance(PLATE, (bolt,), bolt, direction=(0.0, 0.0))
    assert at_rest == math.inf
    assert clear_distance(PLATE, (bolt,), bolt, direction=short) == pytest.approx(
        clear_distance(PLATE, (bolt,), bolt, direction=long), rel=1e-12
    )


def test_straight_across_to_the_side_edges():
    bolt = hole("1", 60, 50)
    assert clear_distance(PLATE, (bolt,), bolt, direction=(0, -1)) == 39
    assert clear_distance(PLATE, (bolt,), bolt, direction=(0, 1)) == 139
    backed = Flat.plain(200.0, 10.0, low_free=False, high_free=False)
    assert clear_distance(backed, (bolt,), bolt, direction=(0, -1)) == math.inf
    assert clear_distance(backed, (bolt,), bolt, direction=(0, 1)) == math.inf


def test_a_slanted_force_meets_the_edge_that_comes_first():
    """3 : 4 : 5. To the end (60 - 11)/0.6 = 81.67 mm; to the low edge (50 - 11)/0.8 = 48.75 mm."""
    bolt = hole("1", 60, 50)
    down = clear_distance(PLATE, (bolt,), bolt, direction=(-3, -4))
    assert down == pytest.approx(48.75, rel=1e-12)
    up = clear_distance(PLATE, (bolt,), bolt, direction=(-3, 4))
    assert up == pytest.approx(49 / 0.6, rel=1e-12)
    closed = Flat.plain(200.0, 10.0, low_free=False)
    beyond = clear_distance(closed, (bolt,), bolt, direction=(-3, -4))
    assert beyond == pytest.approx(49 / 0.6, rel=1e-12)


def test_a_hole_partly_in_the_way():
    """Radii 11 and 9: 12 mm aside they touch after 70 - √(20² - 12²) = 54 mm; 20 aside, never."""
    bolt = hole("1", 120, 100)
    for aside, clear in ((0.0, 50.0), (12.0, 54.0), (-12.0, 54.0), (20.0, 109.0), (30.0, 109.0)):
        other = hole("2", 50, 100 + aside, 18.0)
        found = clear_distance(PLATE, (bolt, other), bolt)
        assert found == pytest.approx(clear, rel=1e-12)


def test_an_empty_hole_is_in_the_way_as_well():
    bolt, empty = hole("1", 120, 100), hole("2", 50, 100, bolt=False)
    assert clear_distance(PLATE, (bolt, empty), bolt) == 70 - 22


def test_a_slanted_force_straight_at_another_hole():
    """Holes 50 mm apart on 3 : 4 : 5, 28 mm between their edges; a pull of any other way clears."""
    bolt, other = hole("1", 100, 100), hole("2", 70, 60)
    found = clear_distance(PLATE, (bolt, other), bolt, direction=(-3, -4))
    assert found == pytest.approx(28.0, rel=1e-12)
    assert clear_distance(PLATE, (bolt, other), bolt, direction=(-3, 4)) > 28.0
    assert clear_distance(PLATE, (bolt, other), bolt, direction=(3, 4)) > 28.0


def test_slots_count_to_their_round_ends():
    long = Opening("1", 120, 100, 22, 50)
    wide = Opening("2", 50, 100, 60, 22)
    assert clear_distance(PLATE, (long,), long) == 120 - 25
    assert clear_distance(PLATE, (long, wide), long) == 70 - 25 - 11
    # Straight side 60 - 22 = 38 mm: 19 mm aside it is still flat; 12 mm further, of radii
    # 11 + 11, it touches after 70 - 14 - √(22² - 12²).
    for aside, clear in ((19.0, 34.0), (31.0, 56 - math.sqrt(340))):
        moved = Opening("2", 50, 100 + aside, 60, 22)
        found = clear_distance(PLATE, (long, moved), long)
        assert found == pytest.approx(clear, rel=1e-12)
    past = Opening("2", 50, 142, 60, 22)
    assert clear_distance(PLATE, (long, past), long) == 95
    # Across: the side of the slot bears, not its end.
    assert clear_distance(PLATE, (long,), long, direction=(0, -1)) == 100 - 11


def test_holes_that_touch_leave_nothing_and_holes_that_overlap_are_refused():
    bolt, touching = hole("1", 100, 100), hole("2", 78, 100)
    assert clear_distance(PLATE, (bolt, touching), bolt) == 0.0
    with pytest.raises(InputError, match="holes '1' and '3' overlap"):
        clear_distance(PLATE, (bolt, hole("3", 85, 110)), bolt)
    with pytest.raises(InputError, match="holes '1' and '3' overlap"):
        clear_distance(PLATE, (bolt, Opening("3", 100, 100, 60, 60)), bolt)


@pytest.mark.parametrize(
    ("x", "y", "words"),
    [
        (10.0, 100.0, "10 mm from the end; at least 11 mm"),
        (60.0, 10.5, "10.5 mm from the low edge; at least 11 mm"),
        (60.0, 190.0, "10 mm from the high edge; at least 11 mm"),
    ],
)
def test_a_hole_that_cuts_an_edge_is_refused(x, y, words):
    bolt = hole("1", x, y)
    with pytest.raises(InputError, match=f"hole '1'.*{words}"):
        clear_distance(PLATE, (bolt,), bolt)


@pytest.mark.parametrize("direction", [(math.nan, 0.0), (-1.0, math.inf)])
def test_a_direction_that_is_not_finite_is_refused(direction):
    bolt = hole("1", 60, 50)
    with pytest.raises(InputError, match="direction: got"):
        clear_distance(PLATE, (bolt,), bolt, direction=direction)
