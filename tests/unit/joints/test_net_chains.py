"""Net-section chains with every area worked by hand beside the test; mm and mm²."""

from __future__ import annotations

from itertools import permutations

import pytest

from tensionlib.errors import InputError
from tensionlib.joints.parts import Flat, Opening, opened_angle, opened_channel
from tensionlib.joints.paths import Hop, NetPath, least_path

PLATE = Flat.plain(150.0, 12.0)
ANGLE = opened_angle(150.0, 100.0, 12.0)  # 150x100x12: heel at 150 - 6 = 144, width 238
CHANNEL = opened_channel(150.0, 75.0, 9.5, 6.0)  # flange 0 to 72, web to 212.5, flange to 284.5


def hole(mark: str, x: float, y: float, d: float = 22.0, *, bolt: bool = True) -> Opening:
    return Opening.round(mark, x, y, d, bolt=bolt)


def marks(path: NetPath) -> str:
    return "".join(hop.hole.mark for hop in path.hops)


# A plate ----------------------------------------------------------------------------------


def test_no_holes_lose_nothing():
    assert least_path(PLATE, []) == NetPath((), 0.0, 1.0)
    assert least_path(PLATE, [], credit_behind=True) == NetPath((), 0.0, 1.0)


def test_one_hole():
    """22·12 = 264."""
    a = hole("a", 40.0, 75.0)
    assert least_path(PLATE, [a]) == NetPath((Hop(a, 0.0, 0.0, 0.0, 12.0),), 264.0, 1.0)


def test_a_stagger_gives_back_a_part_of_the_second_hole():
    """2·264 - 30²·12/(4·60) = 528 - 45 = 483, the step told hole by hole."""
    a, b = hole("a", 40.0, 45.0), hole("b", 70.0, 105.0)
    path = least_path(PLATE, [a, b])
    assert path.hops == (Hop(a, 0.0, 0.0, 0.0, 12.0), Hop(b, 30.0, 60.0, 12.0, 12.0))
    assert [hop.lost for hop in path.hops] == [264.0, 219.0]
    assert path.lost == pytest.approx(483.0, rel=1e-12)


def test_a_step_back_towards_the_end_counts_as_one_ahead():
    ahead = least_path(PLATE, [hole("a", 40.0, 45.0), hole("b", 70.0, 105.0)])
    back = least_path(PLATE, [hole("a", 70.0, 45.0), hole("b", 40.0, 105.0)])
    assert ahead.lost == back.lost
    assert back.hops[1].s == 30.0


def test_holes_of_one_line_along_the_force_are_no_chain():
    """Three holes one behind the other: the way across meets one of them, 264."""
    assert (
        least_path(
            PLATE, [hole(m, x, 75.0) for m, x in zip("abc", (40, 110, 180), strict=True)]
        ).lost
        == 264
    )


@pytest.mark.parametrize(("apart", "count"), [(0.9e-6, 1), (1.1e-6, 2)])
def test_one_line_ends_where_the_holes_are_a_millionth_apart(apart, count):
    """Straight across, so that only the distance across decides whether both are met."""
    path = least_path(PLATE, [hole("a", 40.0, 1.0), hole("b", 40.0, 1.0 + apart)])
    assert len(path.hops) == count


def test_a_stagger_too_great_leaves_one_hole():
    """120²·12/(4·60) = 720 is more than a hole's 264."""
    path = least_path(PLATE, [hole("a", 40.0, 45.0), hole("b", 160.0, 105.0, 24.0)])
    assert (marks(path), path.lost) == ("b", 288.0)


def test_the_greater_hole_rules_before_the_more_holes():
    """50 alone: 600. 22 and 22 in line: 528. 22 with 50: 264 + 600 - 90²·12/(4·20) < 600."""
    group = [hole("a", 40.0, 45.0), hole("b", 40.0, 105.0), hole("c", 130.0, 65.0, 50.0)]
    assert marks(least_path(PLATE, group)) == "c"


def test_a_hole_without_a_bolt_is_a_hole():
    group = [hole("a", 40.0, 45.0), hole("b", 40.0, 105.0, bolt=False)]
    assert least_path(PLATE, group).lost == 528.0


def test_an_edge_that_is_not_free_bounds_the_chain_all_the_same():
    """From the holes to both edges there is no credit, so whose edge it is does not matter."""
    group = [hole("a", 40.0, 45.0), hole("b", 70.0, 105.0)]
    held = Flat.plain(150.0, 12.0, low_free=False, high_free=False)
    assert least_path(held, group) == least_path(PLATE, group)


# Slots ------------------------------------------------------------------------------------


def test_a_slot_along_the_force_loses_its_width():
    """22·12 = 264."""
    assert least_path(PLATE, [Opening("a", 60.0, 75.0, 22.0, 60.0)]).lost == 264.0


def test_a_slot_across_the_force_loses_its_length():
    """60·12 = 720; with a hole of 22 beside it in line, 984."""
    slot = Opening("a", 60.0, 50.0, 60.0, 22.0)
    assert least_path(PLATE, [slot]).lost == 720.0
    assert least_path(PLATE, [slot, hole("b", 60.0, 115.0)]).lost == 984.0


def test_the_stagger_of_a_slot_is_between_centres():
    """264 + 720 - 40²·12/(4·65) = 984 - 73.846 = 910.154."""
    slot = Opening("a", 60.0, 50.0, 60.0, 22.0)
    assert least_path(PLATE, [slot, hole("b", 100.0, 115.0)]).lost == pytest.approx(910.1538462)


# Ties -------------------------------------------------------------------------------------


def test_of_equals_the_chain_with_fewer_holes():
    """A step of 60 over 50 gives back 60²·12/(4·50) = 216, all of a hole of 18: 18·12 = 216."""
    path = least_path(PLATE, [hole("a", 40.0, 40.0, 18.0), hole("b", 100.0, 90.0, 18.0)])
    assert (marks(path), path.lost) == ("b", 216.0)


def test_of_equals_the_straight_step_past_a_hole():
    """Two steps of 30 over 25 give back 2·30²·12/(4·25) = 216, the middle hole: 432 each way."""
    group = [hole("a", 40, 40, 18.0), hole("b", 70, 65, 18.0), hole("c", 40, 90, 18.0)]
    path = least_path(PLATE, group)
    assert (marks(path), path.lost) == ("ac", 432.0)


def test_of_equals_the_chain_with_fewer_holes_before_the_one_nearer_the_body():
    """Two of 22 in line lose 528, and so does a slot of 44 a hundred millimetres and more away."""
    group = [hole("a", 160.0, 45.0), hole("b", 160.0, 105.0), Opening("c", 40.0, 105.0, 44.0, 22.0)]
    path = least_path(PLATE, group)
    assert (marks(path), path.lost) == ("c", 528.0)


def test_of_equals_the_fewer_holes_on_the_way():
    """To d at (100, 110) the step is 60 over 50 from b and from c alike, and gives back 216 of 264.
    a and b in line lose 2·216 = 432, the slot c alone 36·12 = 432."""
    group = [
        hole("a", 40.0, 20.0, 18.0),
        hole("b", 40.0, 60.0, 18.0),
        Opening("c", 160.0, 60.0, 36.0, 18.0),
        hole("d", 100.0, 110.0),
    ]
    path = least_path(PLATE, group)
    assert (marks(path), path.lost) == ("cd", 480.0)


def test_of_equals_the_one_nearest_the_body_in_any_order():
    """Two rows alike: the inner row has the whole force to carry."""
    group = [hole("a", 40, 45), hole("b", 40, 105), hole("c", 180, 45), hole("d", 180, 105)]
    assert {marks(least_path(PLATE, order)) for order in permutations(group)} == {"cd"}


# Both legs of an angle --------------------------------------------------------------------


def test_both_legs_of_150x100x12():
    """Lines 55 mm and 60 mm from the heel lie 55 + 60 - 12 = 103 apart round it.

    2·22·12 - 35²·12/(4·103) = 528 - 35.680 = 492.320.
    """
    long, short = hole("l", 40.0, 150.0 - 55.0), hole("s", 75.0, 150.0 - 12.0 + 60.0)
    path = least_path(ANGLE, [short, long])
    assert marks(path) == "ls"
    assert path.hops[1].g == 103.0
    assert path.lost == pytest.approx(492.3203883)


def test_three_lines_in_150x100x12():
    """Two lines 60 apart in the long leg, one in the short leg, the middle one 35 off:

    3·264 - 35²·12/4·(1/60 + 1/103) = 792 - 61.250 - 35.680 = 695.070; straight 528.
    """
    group = [hole("a", 40.0, 35.0), hole("b", 75.0, 95.0), hole("c", 40.0, 198.0)]
    path = least_path(ANGLE, group)
    assert marks(path) == "abc"
    assert path.lost == pytest.approx(695.0703883)


def test_the_middle_line_drops_out_of_150x100x12_at_a_great_stagger():
    """At 70 off the two steps give back 245 + 142.718, more than the hole's 264."""
    group = [hole("a", 40.0, 35.0), hole("b", 110.0, 95.0), hole("c", 40.0, 198.0)]
    assert (marks(least_path(ANGLE, group)), least_path(ANGLE, group).lost) == ("ac", 528.0)


# Thick and thin ---------------------------------------------------------------------------


def test_from_flange_to_web_the_web_counts_for_the_step():
    """22·9.5 + 22·6 - 40²·6/(4·80) = 209 + 132 - 30 = 311."""
    path = least_path(CHANNEL, [hole("f", 40.0, 30.0), hole("w", 80.0, 110.0)])
    assert [(hop.t, hop.t_step) for hop in path.hops] == [(9.5, 0.0), (6.0, 6.0)]
    assert path.lost == pytest.approx(311.0)


def test_from_flange_to_flange_the_web_between_counts():
    """2·209 - 60²·6/(4·224.5) = 418 - 24.053 = 393.947."""
    path = least_path(CHANNEL, [hole("f", 40.0, 30.0), hole("g", 100.0, 254.5)])
    assert path.hops[1].t_step == 6.0
    assert path.lost == pytest.approx(393.9465479)


def test_within_a_flange_the_flange_counts():
    """2·209 - 30²·9.5/(4·36) = 418 - 59.375 = 358.625."""
    path = least_path(CHANNEL, [hole("f", 40.0, 20.0), hole("g", 70.0, 56.0)])
    assert path.lost == pytest.approx(358.625)


def test_the_flange_hole_rules_alone_where_the_web_hole_pays_back_more_than_itself():
    """100²·6/(4·80) = 187.5 is more than 22·6 = 132; 209 is left, of the flange."""
    path = least_path(CHANNEL, [hole("f", 40.0, 30.0), hole("w", 140.0, 110.0)])
    assert (marks(path), path.lost) == ("f", 209.0)


def test_a_part_of_its_own_kind_is_asked_place_by_place():
    """The search knows no more of a part than the protocol: a web of 8 with a step to 5 at 60."""

    class Stepped:
        width = 120.0

        def thickness(self, y: float) -> float:
            return 8.0 if y < 60.0 else 5.0

        def thickness_between(self, y_1: float, y_2: float) -> float:
            return min(self.thickness(y_1), self.thickness(y_2))

        def to_end(self, x: float, y: float) -> float:
            return x

        def to_low(self, x: float, y: float) -> float:
            return y

        def to_high(self, x: float, y: float) -> float:
            return self.width - y

    # 22·8 + 22·5 - 20²·5/(4·50) = 176 + 110 - 10
    path = least_path(Stepped(), [hole("a", 40.0, 35.0), hole("b", 60.0, 85.0)])
    assert path.lost == pytest.approx(276.0)


# Credit for the bolts behind ----------------------------------------------------------------

ROW = (45.0, 105.0)
TWO_ROWS = [hole(f"{x:g}/{y:g} ", x, y) for x in (40.0, 110.0) for y in ROW]


def test_the_inner_row_carries_the_whole_force():
    """1/(1800 - 528); the outer row loses as much and carries a half."""
    path = least_path(PLATE, TWO_ROWS, credit_behind=True, gross=1800.0)
    assert marks(path) == "110/45 110/105 "
    assert (path.carried, path.lost) == (1.0, 528.0)


def test_a_larger_outer_row_governs_when_it_pays_for_its_credit():
    """One bolt of 22 behind two slots of 60 across: two thirds on 1800 - 1440 against 1 on 1536."""
    outer = [Opening(m, 40.0, y, 60.0, 22.0) for m, y in (("a", 40.0), ("b", 110.0))]
    inner = hole("c", 200.0, 75.0)
    path = least_path(PLATE, [*outer, inner], credit_behind=True, gross=1800.0)
    assert marks(path) == "ab"
    assert path.carried == pytest.approx(2 / 3)
    # With more around them the same slots do not: 2/3 on 3560 against 1 on 4736.
    assert marks(least_path(PLATE, [*outer, inner], credit_behind=True, gross=5000.0)) == "c"


def test_an_empty_hole_behind_takes_no_share():
    outer = [Opening(m, 40.0, y, 60.0, 22.0) for m, y in (("a", 40.0), ("b", 110.0))]
    empty = hole("c", 200.0, 75.0, bolt=False)
    path = least_path(PLATE, [*outer, empty], credit_behind=True, gross=1800.0)
    assert (marks(path), path.carried) == ("ab", 1.0)


def test_without_any_bolt_nothing_is_credited():
    empty = [hole(m, x, 75.0, bolt=False) for m, x in (("a", 40.0), ("b", 110.0))]
    path = least_path(PLATE, empty, credit_behind=True, gross=1800.0)
    assert path.carried == 1.0


@pytest.mark.parametrize(("x", "carried"), [(45.0, 1.0), (95.0, 2 / 3)])
def test_a_bolt_is_behind_a_sloping_step_by_the_line_between_the_holes(x, carried):
    """Slots at (40, 40) and (100, 100): at y = 70 the line is at 70, so 95 is behind and 45 is not,
    though both lie between the slots' own 40 and 100.

    a – b loses 960 - 60²·12/(4·60) = 780; by the small hole 960 + 12 - (55² + 5²)·12/(4·30) = 667.
    2/3 on 900 - 780 is still more than 1 on 900 - 667.
    """
    slots = [Opening("a", 40.0, 40.0, 40.0, 22.0), Opening("b", 100.0, 100.0, 40.0, 22.0)]
    path = least_path(PLATE, [*slots, hole("c", x, 70.0, 1.0)], credit_behind=True, gross=900.0)
    assert (marks(path), path.carried) == ("ab", pytest.approx(carried))
    assert path.lost == pytest.approx(780.0)


@pytest.mark.parametrize("y", [10.0, 140.0])
def test_from_the_outer_holes_to_the_edges_a_chain_goes_straight_across(y):
    """The bolt beyond the last hole is behind when it stands farther in: 2 of 3 are left."""
    slots = [Opening("a", 60.0, 45.0, 50.0, 22.0), Opening("b", 60.0, 105.0, 50.0, 22.0)]
    behind = least_path(PLATE, [*slots, hole("c", 160.0, y, 1.0)], credit_behind=True, gross=1800.0)
    ahead = least_path(PLATE, [*slots, hole("c", 20.0, y, 1.0)], credit_behind=True, gross=1800.0)
    assert (marks(behind), behind.carried) == ("ab", pytest.approx(2 / 3))
    assert (marks(ahead).replace("c", ""), ahead.carried) == ("ab", 1.0)


def test_with_credit_too_a_step_that_gains_nothing_is_not_taken():
    """The same 216 by b alone as by a and b, with no bolt behind either."""
    pair = [hole("a", 40.0, 40.0, 18.0), hole("b", 100.0, 90.0, 18.0)]
    path = least_path(PLATE, pair, credit_behind=True, gross=1800.0)
    assert (marks(path), path.lost, path.carried) == ("b", 216.0, 1.0)


def test_the_gross_area_is_asked_for():
    with pytest.raises(InputError, match=r"gross: missing"):
        least_path(PLATE, TWO_ROWS, credit_behind=True)


def test_a_gross_area_that_the_holes_take_whole_is_refused():
    """Two holes in line take 528."""
    with pytest.raises(InputError, match=r"gross: got 528 mm²; more than 528 mm²"):
        least_path(PLATE, TWO_ROWS, credit_behind=True, gross=528.0)
    assert least_path(PLATE, TWO_ROWS, credit_behind=True, gross=528.1).lost == 528.0
