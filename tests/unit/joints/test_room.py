"""Room for washer, nut and wrench, by hand."""

from __future__ import annotations

import math
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from tensionlib.errors import DataNotFoundError, InputError
from tensionlib.joints.room import (
    Room,
    across_corners,
    rooms,
    socket_outside,
    washer_at_root,
    washer_at_toe,
    washer_outside,
    wrench_at_bolt,
    wrench_at_leg,
)
from tensionlib.steel.bolts import SIZES

# The long leg of 150x90x10, root radius 10 and toe radius 5 mm.
LEG: dict[str, float] = {"width": 150.0, "t_other": 10.0, "r_root": 10.0, "r_toe": 5.0}


def test_diameters_of_m20() -> None:
    """32 mm across flats are 32 × 2/√3 = 36.95 mm across corners."""
    assert across_corners("M20") == pytest.approx(36.950, abs=5e-4)
    assert washer_outside("M20") == 42.0
    assert socket_outside("M20") == 50.0


def test_a_socket_goes_over_its_nut_and_is_wider_than_it() -> None:
    for size in SIZES:
        assert socket_outside(size) > across_corners(size) + 4.0
        assert washer_outside(size) > across_corners(size)


def test_two_lines_on_a_long_leg() -> None:
    found = rooms("M20", **LEG, gauge=55.0, pitch=70.0, line_spacing=60.0)
    beside_nut = 25.0 + 18.475 + 2.0
    expected = [
        ("washer clear of the root radius", 21.0, 55.0 - 10.0 - 10.0),
        ("socket clear of the other leg", 27.0, 45.0),
        ("socket clear of the next nut (pitch)", beside_nut, 70.0),
        ("socket clear of the next nut (line to line)", beside_nut, 60.0),
        ("washer within the toe", 21.0, 150.0 - 115.0 - 5.0),
    ]
    assert [room.what for room in found] == [what for what, _, _ in expected]
    for room, (_, needs, has) in zip(found, expected, strict=True):
        assert room.needs == pytest.approx(needs, abs=5e-4)
        assert room.has == pytest.approx(has)
        assert room.ok
        assert "no source" in room.note
    assert [room.advice for room in found] == [False, False, False, False, True]


def test_one_bolt_has_no_neighbour() -> None:
    assert len(rooms("M20", **LEG, gauge=55.0)) == 3


@pytest.mark.parametrize(
    ("change", "what"),
    [
        ({"gauge": 40.0}, "washer clear of the root radius"),
        ({"gauge": 36.0, "r_root": 4.0}, "socket clear of the other leg"),
        ({"pitch": 45.0}, "socket clear of the next nut (pitch)"),
        ({"line_spacing": 45.0}, "socket clear of the next nut (line to line)"),
        ({"line_spacing": 70.0}, "washer within the toe"),
    ],
)
def test_each_check_can_fail_alone(change: dict[str, float], what: str) -> None:
    case = LEG | {"gauge": 55.0, "pitch": 70.0, "line_spacing": 60.0} | change
    assert [room.what for room in rooms("M20", **case) if not room.ok] == [what]


@pytest.mark.parametrize(
    ("pitch", "stagger", "along"),
    [
        (70.0, 35.0, 35.0),
        (70.0, 60.0, 10.0),  # the line's other bolt is nearer
        (70.0, 70.0, 0.0),
        (None, 35.0, 35.0),
    ],
)
def test_staggered_lines(pitch: float | None, stagger: float, along: float) -> None:
    found = rooms("M20", **LEG, gauge=55.0, pitch=pitch, line_spacing=40.0, stagger=stagger)
    [lines] = [room for room in found if "line to line" in room.what]
    assert lines.has == pytest.approx(math.hypot(along, 40.0))


def test_just_enough_is_enough() -> None:
    assert Room("", 21.0, 21.0, "").ok
    assert Room("", 0.3, 0.1 + 0.2, "").ok
    assert not Room("", 21.0, 20.999, "").ok


def test_negative_room_is_told_and_not_refused() -> None:
    room = washer_at_root(15.0, 10.0, 10.0, "M20")
    assert (room.has, room.ok) == (-5.0, False)


@pytest.mark.parametrize(
    ("call", "name"),
    [
        (lambda: washer_at_root(0.0, 10.0, 10.0, "M20"), "gauge"),
        (lambda: washer_at_root(55.0, -1.0, 10.0, "M20"), "t_other"),
        (lambda: washer_at_root(55.0, 10.0, math.nan, "M20"), "r_root"),
        (lambda: wrench_at_leg(math.inf, 10.0, "M20"), "gauge"),
        (lambda: wrench_at_bolt(0.0, "M20"), "spacing"),
        (lambda: washer_at_toe(0.0, 55.0, 5.0, "M20"), "width"),
        (lambda: washer_at_toe(150.0, 55.0, -5.0, "M20"), "r_toe"),
        (lambda: rooms("M20", **LEG, gauge=55.0, stagger=-1.0), "stagger"),
        (lambda: rooms("M20", **LEG, gauge=55.0, stagger=35.0), "stagger"),
        (lambda: rooms("M20", **LEG, gauge=55.0, line_spacing=0.0), "line_spacing"),
        (lambda: rooms("M20", **LEG, gauge=55.0, pitch=-70.0, line_spacing=60.0), "spacing"),
    ],
)
def test_what_is_no_length(call: Any, name: str) -> None:
    with pytest.raises(InputError, match=f"^{name}: got"):
        call()


@pytest.mark.parametrize("diameter", [washer_outside, across_corners, socket_outside])
def test_a_size_without_a_row(diameter: Any) -> None:
    with pytest.raises(DataNotFoundError, match=r"'M18'.*M12, M16, M20.*M36"):
        diameter("M18")


@given(
    st.sampled_from(list(SIZES)),
    st.floats(30.0, 100.0),
    st.floats(30.0, 120.0),
    st.floats(0.0, 120.0),
)
def test_moving_away_from_the_heel_trades_root_for_toe(
    size: str, gauge: float, pitch: float, stagger: float
) -> None:
    one = rooms(size, **LEG, gauge=gauge, pitch=pitch, line_spacing=40.0, stagger=stagger)
    two = rooms(size, **LEG, gauge=gauge + 5.0, pitch=pitch, line_spacing=40.0, stagger=stagger)
    moved = [b.has - a.has for a, b in zip(one, two, strict=True)]
    assert moved == pytest.approx([5.0, 5.0, 0.0, 0.0, -5.0])
    # The nearest bolt of the other line is never more than half a pitch along.
    assert 40.0 <= one[3].has <= math.hypot(40.0, pitch / 2) + 1e-9
