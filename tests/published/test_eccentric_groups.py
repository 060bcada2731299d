"""Worked examples of bolts and fillet welds under an eccentric force, by elastic vectors.

Inputs and answers are known from memory of the sources:

- Salmon, Johnson and Malhas, Steel Structures, example 4.12.1 of the earlier editions.
- Segui, Steel Design, example 8.1 (bolts) and the bracket welded on three sides, loaded in the
  plane of its welds (its number is not remembered).
- Budynas and Nisbett, Shigley's Mechanical Engineering Design, 8th and later editions, examples
  8-7 (bolts) and 9-1 (weld).

The examples load brackets straight down or at a slant: the layouts are turned here so that the
force runs along x. Tolerance: as printed, half a unit of the last figure.

No published example of balanced fillets is remembered with its inputs and answers, so none is here.
"""

from __future__ import annotations

import math

import pytest

from tensionlib.joints.bolt_group import elastic_shares, most_loaded
from tensionlib.joints.fillet_group import Run, elastic_stress, properties
from tensionlib.joints.parts import Opening
from tensionlib.standards.common_as_nzs import pattern, welds
from tests.printed import agrees

ROOT_2 = math.sqrt(2.0)


def downwards(right: float, up: float) -> tuple[float, float]:
    """A point of an upright drawing, for a force straight down: x down, y to the right."""
    return -up, right


def test_salmon_4_12_1_six_bolts():
    """24 kip, 5 in from two columns of three bolts, 4 in apart, pitch 3 in. Printed: sum of squares
    60 in², 10.0 kip on the bolt most loaded, from 4 and 4 kip down and 6 kip across."""
    bolts = [
        Opening.round(f"{right},{up}", *downwards(right, up), 0.9)
        for right in (-2.0, 2.0)
        for up in (-3.0, 0.0, 3.0)
    ]
    group = elastic_shares(bolts, 5.0)
    assert agrees(group.I_p, "60", figures=2)
    most = most_loaded(group)
    assert agrees(24 * most.along, "8.0")
    assert agrees(24 * abs(most.across), "6.0")
    assert agrees(24 * most.size, "10.0")


def test_segui_8_1_eight_bolts_under_a_slanted_force():
    """50 kip at 2 down to 1 across, two columns 5.5 in apart at heights 0, 5, 8, 11 in; the force
    acts 12 in right of the right column and 14 in up. Printed: centroid 6 in up, moment 480.7
    in-kip, sum of squares 192.5 in², 17.78 and 12.46 kip, 21.7 kip on the bolt most loaded."""
    root_5 = math.sqrt(5.0)

    def turned(right: float, up: float) -> tuple[float, float]:
        """x along the force, down and to the left at 2 to 1."""
        return (-right - 2 * up) / root_5, (2 * right - up) / root_5

    bolts = [
        Opening.round(f"{right},{up}", *turned(right, up), 0.9)
        for right in (0.0, 5.5)
        for up in (0.0, 5.0, 8.0, 11.0)
    ]
    _, line = turned(5.5 + 12.0, 14.0)
    group = elastic_shares(bolts, line)
    assert (group.x_c, group.y_c) == pytest.approx(turned(2.75, 6.0))
    # A whole unit: the source takes the moment of 44.72 and 22.36 kip, rounded.
    assert agrees(50 * abs(group.e), "480.7", units=1.0)
    assert agrees(group.I_p, "192.5")
    most = most_loaded(group)
    assert most.mark == "5.5,0.0"
    left = (most.along + 2 * -most.across) / root_5
    down = (2 * most.along + most.across) / root_5
    assert agrees(50 * left, "17.78")
    assert agrees(50 * down, "12.46")
    assert agrees(50 * most.size, "21.7")


def test_shigley_8_7_four_bolts():
    """16 kN, 425 mm from four bolts 150 mm by 120 mm apart. Printed: A and B 21.0 kN, C and D
    14.8 kN."""
    bolts = [
        Opening.round(f"{right},{up}", *downwards(right, up), 17.0)
        for right in (-75.0, 75.0)
        for up in (-60.0, 60.0)
    ]
    group = elastic_shares(bolts, 425.0)
    for share in group.shares:
        near_the_force = share.y > 0.0
        assert agrees(16 * share.size, "21.0" if near_the_force else "14.8")
    assert most_loaded(group).y == 75.0


def test_segui_bracket_welded_on_three_sides():
    """60 kip, 10 in from the open side of a C weld: two runs of 8 in, one of 12 in between them.
    For throats of 1 in, printed: 2.286 in to the centroid, 915 in⁴, 10.1 kip/in at the worst."""
    leg = ROOT_2
    runs = [
        Run("bottom", *downwards(0, 0), *downwards(8, 0), leg),
        Run("side", *downwards(0, 0), *downwards(0, 12), leg),
        Run("top", *downwards(0, 12), *downwards(8, 12), leg),
    ]
    group = properties(runs)
    assert agrees(group.length, "28.0")
    assert agrees(group.y_c, "2.286")
    assert agrees(group.I_p, "915")
    peak = elastic_stress(group, 18.0)
    assert agrees(60 * peak.per_length, "10.1")
    assert peak.y == pytest.approx(8 - group.y_c)


def test_shigley_9_1_a_fitting_welded_on_three_sides():
    """25 kN a weld, 100 mm from the closed side: two runs of 56 mm, one of 190 mm, 6 mm legs.
    Printed: 1280 mm², centroid 10.4 mm from the long run, 7.07e6 mm⁴, 19.5 MPa direct, 43.9 MPa
    at the ends of the long run."""
    runs = [
        Run("bottom", *downwards(-56, 0), *downwards(0, 0), 6.0),
        Run("long", *downwards(0, 0), *downwards(0, 190), 6.0),
        Run("top", *downwards(-56, 190), *downwards(0, 190), 6.0),
    ]
    group = properties(runs)
    assert agrees(group.area, "1280")
    assert agrees(-group.y_c, "10.4")
    assert agrees(group.I_p / 1e6, "7.07")
    assert agrees(25_000 / group.area, "19.5")
    peak = elastic_stress(group, 100.0)
    assert agrees(25_000 * peak.size, "43.9")
    assert peak.y == pytest.approx(-group.y_c)


# By the formulas that a calculation prints --------------------------------------------------


def test_the_printed_lines_give_the_examples_of_bolts():
    """Salmon 4.12.1 and Shigley 8-7 by the lines V_x, V_y and their resultant."""
    V_x = pattern.share_along(24.0, 6.0, -5.0, 2.0, 60.0)
    V_y = pattern.share_across(24.0, -5.0, 3.0, 60.0)
    assert agrees(V_x, "8.0")
    assert agrees(abs(V_y), "6.0")
    assert agrees(pattern.resultant(V_x, V_y), "10.0")
    I_b = 4 * (75.0**2 + 60.0**2)
    for y, printed in ((75.0, "21.0"), (-75.0, "14.8")):
        along = pattern.share_along(16.0, 4.0, -425.0, y, I_b)
        assert agrees(
            pattern.resultant(along, pattern.share_across(16.0, -425.0, 60.0, I_b)), printed
        )


def test_the_printed_lines_give_the_example_of_the_weld():
    """Shigley 9-1 by the lines τ_x, τ_y and their resultant."""
    runs = [
        Run("bottom", *downwards(-56, 0), *downwards(0, 0), 6.0),
        Run("long", *downwards(0, 0), *downwards(0, 190), 6.0),
        Run("top", *downwards(-56, 190), *downwards(0, 190), 6.0),
    ]
    group = properties(runs)
    peak = elastic_stress(group, 100.0)
    A_w = welds.throats_of_plies(1.0, group.area)
    I_w = welds.inertia_of_plies(1.0, group.I_p)
    e = group.y_c - 100.0
    along = welds.throat_stress_along(25_000.0, A_w, e, peak.y, I_w)
    across = welds.throat_stress_across(25_000.0, e, peak.x, I_w)
    assert agrees(welds.throat_stress(along, across), "43.9")
