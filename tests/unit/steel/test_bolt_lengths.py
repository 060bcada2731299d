"""Lengths of bolts by hand, and what must hold for every joint."""

from __future__ import annotations

import math
from itertools import pairwise
from typing import Any

import pytest
from hypothesis import assume, example, given
from hypothesis import strategies as st

from tensionlib.errors import DataNotFoundError, InputError, UnitError
from tensionlib.steel.bolt_lengths import (
    HARDWARE,
    LENGTHS,
    buildable,
    hardware,
    longer_length,
    pick_length,
    shank_length,
    thread_length,
)
from tensionlib.steel.bolts import SIZES

STEPS = [math.nextafter(125.0, 999.0), math.nextafter(200.0, 999.0)]


@pytest.mark.parametrize(
    ("length", "thread"),
    [(40.0, 40.0), (46.0, 46.0), (125.0, 46.0), (STEPS[0], 52.0), (200.0, 52.0), (STEPS[1], 65.0)],
)
def test_thread_length_on_both_sides_of_each_step(length: float, thread: float) -> None:
    assert thread_length(20.0, length) == thread


def test_the_series_of_lengths() -> None:
    assert [x for x in LENGTHS if 65 <= x <= 200] == [
        *(65, 70, 75, 80, 90, 100, 110, 120, 130, 140, 150, 160, 180, 200)
    ]


def test_every_size_has_a_row_and_its_range_is_in_the_series() -> None:
    assert set(HARDWARE) == set(SIZES)
    for row in HARDWARE.values():
        assert {row.shortest, row.longest} <= set(LENGTHS)
        assert row.shortest < row.shortest_shank < row.longest
        assert row.washer.least < row.washer.most < row.nut
        assert row.washer.outside > SIZES[row.size].across_flats * 2 / math.sqrt(3)


def test_rows_grow_with_the_size() -> None:
    rows = list(HARDWARE.values())
    for a, b in pairwise(rows):
        assert a.nut < b.nut
        assert a.washer.outside < b.washer.outside
        assert a.longest < b.longest


def test_worst_of_the_listed_products() -> None:
    """M20: structural nut 20.7; washers 2.7 to 3.3 and 3.1 to 4.6, outside 42 and 37 mm."""
    row = hardware("M20")
    assert (row.nut, row.washer.least, row.washer.most, row.washer.outside) == (
        *(20.7, 2.7, 4.6, 42.0),
    )


def test_a_leg_on_a_gusset() -> None:
    """M20, 10 + 12 mm: 22 + 4.6 + 20.7 + 2.5 = 49.8, so 50; 46 mm of thread leave no shank."""
    bolt = pick_length("M20", [10.0, 12.0])
    assert bolt.designation == "M20 × 50"
    assert (bolt.grip, bolt.thread, bolt.shank) == (22.0, 46.0, 0.0)
    assert bolt.projection == pytest.approx(50.0 - 22.0 - 4.6 - 20.7)
    assert bolt.planes_at == (10.0,)
    assert bolt.planes_in_threads == (True,)


def test_a_length_that_fits_to_the_last_bit_is_taken() -> None:
    """22.2 + 4.6 + 20.7 + 2.5 = 50.0."""
    assert pick_length("M20", [10.2, 12.0]).nominal == 50.0
    assert pick_length("M20", [10.21, 12.0]).nominal == 55.0


@pytest.mark.parametrize(
    ("plies", "in_threads"),
    [
        # 50 mm of grip: 77.8, so 80, with 80 - 46 - 12.5 = 21.5 mm of shank.
        ([10.0, 40.0], (False,)),
        ([21.5, 28.5], (False,)),
        ([21.6, 28.4], (True,)),
        ([40.0, 10.0], (True,)),
        ([10.0, 30.0, 10.0], (False, True)),
    ],
)
def test_planes_beside_the_end_of_the_shank(
    plies: list[float], in_threads: tuple[bool, ...]
) -> None:
    bolt = pick_length("M20", plies)
    assert (bolt.nominal, bolt.shank) == (80.0, 21.5)
    assert bolt.planes_in_threads == in_threads


def test_head_on_the_last_ply() -> None:
    bolt = pick_length("M20", [10.0, 30.0, 12.0], head_on_first=False)
    assert bolt.planes_at == (42.0, 12.0)
    assert bolt.planes_in_threads == (True, False)


def test_a_washer_under_the_head_pushes_the_plane_into_the_thread() -> None:
    """42.3 mm need 70.1 or, with two washers, 74.7: 75 both times, and 16.5 mm of shank."""
    without = pick_length("M20", [14.0, 28.3])
    one = pick_length("M20", [14.0, 28.3], washers_head=1)
    assert without.nominal == one.nominal == 75.0
    assert without.planes_in_threads == (False,)
    assert one.planes_at == (pytest.approx(18.6),)
    assert one.planes_in_threads == (True,)


def test_more_washers_ask_for_more_length() -> None:
    """M24, 20 + 20 mm: 40 + 24.2 + 3 + 4.6 n is 67.2, 71.8 and 76.4."""
    picked = [pick_length("M24", [20.0, 20.0], washers_nut=n).nominal for n in range(3)]
    assert picked == [70.0, 75.0, 80.0]


def test_a_second_washer_makes_room_for_a_shank() -> None:
    """M20 × 70: thread from 24 mm, nut face at 22 + 2 × 2.7 = 27.4, a clear thread is 2.5 mm.

    With one washer the nut face lies at 24.7 and a 65 mm bolt, 6.5 mm of shank, is the longest.
    """
    longer = longer_length("M20", [10.0, 12.0])
    assert longer is not None
    assert (longer.designation, longer.washers_nut, longer.shank) == ("M20 × 70", 2, 11.5)
    assert longer.planes_in_threads == (False,)
    # A plane 0.1 mm past that shank is out of reach: the next length runs out of thread.
    assert longer_length("M20", [11.6, 10.4]) is None


def test_a_longer_length_is_the_picked_one_where_that_already_does() -> None:
    assert longer_length("M20", [10.0, 40.0]) == pick_length("M20", [10.0, 40.0])


def test_a_longer_length_takes_no_washer_it_does_not_need() -> None:
    """M20, 17 + 30 mm picks 75 with 16.5 mm of shank; 80 has 21.5, and its thread starts at
    34 mm, well before the nut at 49.7."""
    picked = pick_length("M20", [17.0, 30.0])
    assert (picked.nominal, picked.planes_in_threads) == (75.0, (True,))
    longer = longer_length("M20", [17.0, 30.0])
    assert longer is not None
    assert (longer.nominal, longer.washers_nut) == (80.0, 1)


def test_verdicts() -> None:
    safe = buildable("in shear plane", "M20", [10.0, 12.0])
    assert safe.ok
    assert "M20 × 50" in safe.why
    good = buildable("out of shear plane", "M20", [10.0, 40.0])
    assert good.ok
    assert "21.5 mm of full shank" in good.why
    bad = buildable("out of shear plane", "M20", [10.0, 12.0])
    assert not bad.ok
    assert "in the shear plane at 10 mm" in bad.why
    assert "order M20 × 70 with 2 washers under the nut" in bad.why
    assert "turn the bolt round" not in bad.why
    assert "take threads in the shear plane" in bad.why


def test_a_verdict_says_to_turn_the_bolt() -> None:
    bad = buildable("out of shear plane", "M20", [40.0, 10.0])
    assert not bad.ok
    assert "turn the bolt round" in bad.why
    assert buildable("out of shear plane", "M20", [40.0, 10.0], head_on_first=False).ok


def test_the_ply_a_verdict_asks_for_is_the_thinnest_that_does() -> None:
    """Three plies of 12 mm: the last must be 29 mm thick, to the millimetre."""
    bad = buildable("out of shear plane", "M20", [12.0, 12.0, 12.0])
    assert "the ply next to the nut at least 29 mm thick (M20 × 90)" in bad.why
    assert buildable("out of shear plane", "M20", [12.0, 12.0, 29.0]).ok
    almost = buildable("out of shear plane", "M20", [12.0, 12.0, 28.0])
    assert not almost.ok
    assert "at least 29 mm thick" in almost.why


def test_a_verdict_names_each_plane_and_the_way_that_is_left() -> None:
    """M24 × 240, the longest held, has 240 - 73 - 15 = 152 mm of shank either way round."""
    bad = buildable("out of shear plane", "M24", [20.0, 135.0, 25.0, 20.0])
    assert "152 mm of full shank" in bad.why
    assert "at 155 mm and at 180 mm: take threads in the shear plane" in bad.why


def test_notes_before_ordering() -> None:
    short = pick_length("M20", [10.0, 36.0])
    assert short.nominal == 75.0
    assert any("start at 80 mm" in note for note in short.notes)
    assert any("75 mm is not in the series" in note for note in short.notes)
    plain = pick_length("M20", [10.0, 40.0])
    assert plain.notes == (hardware("M20").unsure,)
    # Threaded to its head by any rule: nothing to confuse it with.
    assert len(pick_length("M20", [10.0, 12.0]).notes) == 1
    assert "structural nut and washer" in pick_length("M22", [10.0, 12.0]).notes[-1]


@pytest.mark.parametrize("pick", [hardware, lambda s: shank_length(s, 80.0)])
def test_a_size_without_a_row(pick: Any) -> None:
    with pytest.raises(DataNotFoundError, match=r"'M18'.*M12, M16, M20.*M36"):
        pick("M18")
    with pytest.raises(DataNotFoundError, match="20"):
        pick(20)


def test_a_joint_longer_than_any_bolt() -> None:
    with pytest.raises(DataNotFoundError, match=r"plies: 200 mm.*227\.8 mm.*200 mm"):
        pick_length("M20", [100.0, 100.0])
    assert longer_length("M20", [100.0, 100.0]) is None


def test_a_joint_that_leaves_the_nut_no_thread() -> None:
    """M12, 57 mm, two washers: 80.15 asks for 90, whose thread starts at 60 > 61.6 - 1.75."""
    with pytest.raises(InputError, match=r"57 mm in all with 2 washers.*80\.15 mm.*too short"):
        pick_length("M12", [28.0, 29.0], washers_head=1)


@pytest.mark.parametrize("plies", [[10.0], [], [10.0, 0.0], [10.0, -1.0], [10.0, math.nan]])
def test_plies_that_are_none(plies: list[float]) -> None:
    with pytest.raises(InputError, match="plies: got"):
        pick_length("M20", plies)


@pytest.mark.parametrize("function", [pick_length, longer_length])
@pytest.mark.parametrize("side", ["washers_head", "washers_nut"])
def test_washers_outside_what_is_accepted(function: Any, side: str) -> None:
    for number in (-1, 3):
        with pytest.raises(InputError, match=f"{side}: got {number}"):
            function("M20", [10.0, 12.0], **{side: number})
    with pytest.raises(UnitError, match=side):
        function("M20", [10.0, 12.0], **{side: "1"})


def test_words_that_are_none() -> None:
    with pytest.raises(InputError, match=r"threads: got 'excluded'.*'out of shear plane'"):
        buildable("excluded", "M20", [10.0, 12.0])


SIZE = st.sampled_from(list(SIZES))
PLY = st.floats(4.0, 60.0)
PLIES = st.lists(PLY, min_size=2, max_size=4)
WASHERS = st.integers(0, 2)


def _picked(size: str, plies: list[float], **how: Any) -> Any:
    try:
        return pick_length(size, plies, **how)
    except (DataNotFoundError, InputError):
        assume(False)


@given(SIZE, PLIES, WASHERS, WASHERS, st.booleans())
def test_every_bolt_sticks_out_and_tightens(
    size: str, plies: list[float], head: int, nut: int, first: bool
) -> None:
    bolt = _picked(size, plies, washers_head=head, washers_nut=nut, head_on_first=first)
    pitch, row = SIZES[size].pitch, HARDWARE[size]
    assert bolt.nominal in LENGTHS
    assert bolt.grip == pytest.approx(sum(plies))
    outer = sum(plies) + (head + nut) * row.washer.most + row.nut
    assert bolt.projection == pytest.approx(bolt.nominal - outer)
    assert bolt.projection >= pitch - 1e-6
    # The nut turns on full thread: it starts a pitch before the nut on the thinnest washers.
    inner = sum(plies) + (head + nut) * row.washer.least
    assert bolt.nominal - bolt.thread <= inner - pitch + 1e-6
    # Full shank, the transition, the thread and nothing else.
    assert bolt.shank == pytest.approx(max(0.0, bolt.nominal - bolt.thread - 5 * pitch))
    assert len(bolt.planes_in_threads) == len(plies) - 1


@given(SIZE, PLIES, WASHERS, WASHERS)
def test_no_shorter_length_would_stick_out(
    size: str, plies: list[float], head: int, nut: int
) -> None:
    bolt = _picked(size, plies, washers_head=head, washers_nut=nut)
    row = HARDWARE[size]
    outer = sum(plies) + (head + nut) * row.washer.most + row.nut + SIZES[size].pitch
    shorter = [x for x in LENGTHS if row.shortest <= x < bolt.nominal]
    assert all(x < outer for x in shorter)


@given(SIZE, PLIES, st.floats(0.0, 40.0), WASHERS)
@example("M20", [10.2, 12.0], 1e-3, 1)
def test_a_longer_grip_never_gets_a_shorter_bolt(
    size: str, plies: list[float], more: float, nut: int
) -> None:
    thick = [*plies[:-1], plies[-1] + more]
    bolt, longer = _picked(size, plies, washers_nut=nut), _picked(size, thick, washers_nut=nut)
    assert longer.nominal >= bolt.nominal
    # Thickness beside the nut never brings the thread into a plane.
    for before, after in zip(bolt.planes_in_threads, longer.planes_in_threads, strict=True):
        assert before or not after


@given(SIZE, PLIES, WASHERS, WASHERS)
def test_turning_the_bolt_is_turning_the_joint(
    size: str, plies: list[float], head: int, nut: int
) -> None:
    turned = _picked(size, plies, washers_head=head, washers_nut=nut, head_on_first=False)
    mirror = _picked(size, plies[::-1], washers_head=head, washers_nut=nut)
    assert turned.planes_in_threads == mirror.planes_in_threads[::-1]
    assert turned.planes_at == mirror.planes_at[::-1]
    assert turned.nominal == mirror.nominal


@given(SIZE, PLIES, WASHERS, st.booleans())
def test_a_longer_length_keeps_what_it_promises(
    size: str, plies: list[float], nut: int, first: bool
) -> None:
    longer = longer_length(size, plies, washers_nut=nut, head_on_first=first)
    if longer is None:
        verdict = buildable_or_none(size, plies, nut, first)
        assert verdict is None or not verdict
        return
    assert not any(longer.planes_in_threads)
    assert max(longer.planes_at) <= longer.shank + 1e-6
    assert nut <= longer.washers_nut <= 2
    assert longer.projection >= SIZES[size].pitch - 1e-6


def buildable_or_none(size: str, plies: list[float], nut: int, first: bool) -> bool | None:
    """The verdict on threads out of the plane, or None where no bolt goes in at all."""
    try:
        return buildable("out of shear plane", size, plies, washers_nut=nut, head_on_first=first).ok
    except (DataNotFoundError, InputError):
        return None
