"""Parts opened flat: thickness along them, free edges, and holes that cannot be there."""

from __future__ import annotations

import math

import numpy as np
import pytest

from tensionlib.errors import InputError
from tensionlib.joints.parts import (
    Flat,
    Opening,
    Strip,
    check_holes,
    opened_angle,
    opened_channel,
)

PLATE = Flat.plain(150.0, 12.0)


def hole(mark: str, x: float, y: float, d: float = 22.0) -> Opening:
    return Opening.round(mark, x, y, d)


# Geometry ---------------------------------------------------------------------------------


def test_a_plate_has_two_free_edges_and_an_end():
    assert PLATE.width == 150.0
    assert PLATE.to_end(40.0, 60.0) == 40.0
    assert PLATE.to_low(40.0, 60.0) == 60.0
    assert PLATE.to_high(40.0, 60.0) == 90.0


def test_an_edge_that_is_not_free_is_infinitely_far():
    leg = Flat.plain(150.0, 12.0, low_free=False)
    assert leg.to_low(40.0, 60.0) == math.inf
    assert leg.to_high(40.0, 60.0) == 90.0
    web = Flat.plain(304.0, 6.1, low_free=False, high_free=False)
    assert (web.to_low(1.0, 152.0), web.to_high(1.0, 152.0)) == (math.inf, math.inf)


def test_an_opened_angle():
    """150 + 100 - 12 = 238 wide, folded at 150 - 6 = 144 from the long leg's toe."""
    part = opened_angle(150.0, 100.0, 12.0)
    assert part.width == 238.0
    assert [(s.name, s.low, s.high, s.t) for s in part.strips] == [
        ("long leg", 0.0, 144.0, 12.0),
        ("short leg", 144.0, 238.0, 12.0),
    ]
    assert part.strips[1].low - part.strips[0].low == 150.0 - 12.0 / 2


def test_an_opened_channel():
    """200x75, flanges 12, web 6: flange 75 - 3 = 72, web 200 - 12 = 188, flange 72."""
    part = opened_channel(200.0, 75.0, 12.0, 6.0)
    assert [(s.name, s.low, s.high, s.t) for s in part.strips] == [
        ("flange 1", 0.0, 72.0, 12.0),
        ("web", 72.0, 260.0, 6.0),
        ("flange 2", 260.0, 332.0, 12.0),
    ]
    # The middle lines times their thicknesses are the section's area without its fillets.
    area = math.fsum((s.high - s.low) * s.t for s in part.strips)
    assert area == 2 * 72 * 12 + 188 * 6


def test_thickness_on_and_between_strips():
    part = opened_channel(200.0, 75.0, 12.0, 6.0)
    assert part.thickness(30.0) == 12.0
    assert part.thickness(166.0) == 6.0
    assert part.thickness(72.0) == 6.0  # on the fold: the thinner
    assert part.thickness_between(30.0, 60.0) == 12.0
    assert part.thickness_between(60.0, 100.0) == 6.0
    assert part.thickness_between(300.0, 30.0) == 6.0  # over the web, either way round
    assert part.thickness_between(30.0, 72.0) == 12.0  # up to the fold, not past it


def test_a_plate_standing_on_another_lets_no_tear_pass():
    flange = Flat((Strip("", 0.0, 165.0, 10.2),), backs=(82.5,))
    assert flange.thickness_between(37.5, 70.0) == 10.2
    assert flange.thickness_between(37.5, 127.5) > 1e5
    assert math.isfinite(flange.thickness_between(37.5, 127.5))
    assert flange.thickness(127.5) == 10.2


@pytest.mark.parametrize(
    "part",
    [
        opened_channel(200.0, 75.0, 12.0, 6.0),
        opened_angle(150.0, 100.0, 12.0),
        Flat((Strip("", 0.0, 165.0, 10.2),), backs=(82.5,)),
    ],
)
def test_all_steps_at_once_are_each_step(part):
    y = np.array([10.0, 37.5, 72.0, 100.0, 127.5, 150.0])
    steps = part.steps(y)
    for i, a in enumerate(y):
        for j, b in enumerate(y):
            if i != j:
                assert steps[i, j] == part.thickness_between(a, b), (a, b)


# Refusals ---------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("strips", "message"),
    [
        ((), "strips: none; give at least one strip"),
        ((Strip("web", 5.0, 60.0, 6.0),), "'web' from 5 to 60 mm, .* side by side from 0 mm"),
        ((Strip("web", 0.0, 0.0, 6.0),), "'web' from 0 to 0 mm"),
        ((Strip("web", 0.0, 60.0, 0.0),), "'web' from 0 to 60 mm, 0 mm thick"),
        (
            (Strip("a", 0.0, 60.0, 6.0), Strip("b", 61.0, 90.0, 6.0)),
            "'b' from 61 to 90 mm, 6 mm thick; strips side by side from 60 mm are due",
        ),
    ],
)
def test_strips_that_do_not_join_are_refused(strips, message):
    with pytest.raises(InputError, match=message):
        Flat(strips)


LEG = Flat.plain(150.0, 12.0, low_free=False)

BAD_HOLES = [
    (PLATE, [hole("1", 40, 60), hole("1", 110, 60)], "holes: the mark '1' stands twice"),
    (PLATE, [hole("1", 11, 60)], r"hole '1' at \(11, 60\) mm: it cuts the end.*more end distance"),
    (PLATE, [hole("1", 40, 11)], r"hole '1' at \(40, 11\) mm: it cuts an edge.* 0 to 150 mm"),
    (PLATE, [hole("1", 40, 139)], "it cuts an edge of the part, which runs from 0 to 150 mm"),
    (LEG, [hole("1", 40, 11)], "it cuts an edge"),
    (LEG, [hole("1", 40, 160)], "it cuts an edge"),
    (PLATE, [hole("1", 40, 60), hole("2", 62, 60)], "holes '1' and '2' overlap; move one of them"),
    (
        PLATE,
        # 13.2² + 17.6² = 22²: they touch.
        [hole("a", 40, 60), hole("b", 53.2, 77.6)],
        "holes 'a' and 'b' overlap",
    ),
    (
        PLATE,
        # A slot's half length of 25 and half a hole's 11 reach 36 along the force.
        [Opening("s", 60, 60, 22.0, 50.0), hole("h", 96, 60)],
        "holes 's' and 'h' overlap",
    ),
    (PLATE, [Opening("s", 25, 60, 22.0, 50.0)], "hole 's' .* it cuts the end"),
    (PLATE, [Opening("s", 60, 25, 50.0, 22.0)], "hole 's' .* it cuts an edge"),
]


@pytest.mark.parametrize(("part", "holes", "message"), BAD_HOLES)
def test_holes_that_cannot_be_there_are_refused(part, holes, message):
    with pytest.raises(InputError, match=message):
        check_holes(part, holes)


def test_holes_that_just_fit_are_taken():
    check_holes(PLATE, [hole("1", 11.01, 11.01), hole("2", 33.02, 11.01), hole("3", 60, 138.99)])
    check_holes(PLATE, [hole("a", 40, 60), hole("b", 53.21, 77.61)])
    check_holes(PLATE, [Opening("s", 60, 60, 22.0, 50.0), hole("h", 96.01, 60)])
