"""Runs of fillet weld by hand: properties, peak stress, balanced lengths."""

from __future__ import annotations

import math

import pytest

from tensionlib.errors import InputError
from tensionlib.joints.fillet_group import (
    Run,
    balanced_runs,
    elastic_stress,
    properties,
    stress_at,
)

ROOT_2 = math.sqrt(2.0)

# Legs of 6√2 mm, throats of 6 mm. Heel and toe of a 100 mm leg, and across its end.
LEG = 6.0 * ROOT_2
HEEL = Run("heel", 0, 0, 120, 0, LEG)
TOE = Run("toe", 0, 100, 120, 100, LEG)
END = Run("end", 0, 0, 0, 100, LEG)


def test_length_throat_and_angle_of_a_run():
    run = Run("a", 10, 10, 40, -30, 8.0)
    assert run.length == 50.0
    assert run.throat == pytest.approx(5.656854, rel=1e-6)
    assert run.angle == pytest.approx(math.atan(4 / 3), rel=1e-12)
    assert HEEL.angle == 0.0
    assert END.angle == pytest.approx(math.pi / 2, rel=1e-12)
    assert Run("back", 120, 0, 0, 0, 6.0).angle == 0.0


def test_two_equal_runs():
    """Throats 6 mm: area 2·6·120 = 1440 mm²; I_p = 1440 (120²/12 + 50²) = 5 328 000 mm⁴."""
    group = properties([HEEL, TOE])
    assert group.length == 240.0
    assert group.area == pytest.approx(1440.0, rel=1e-12)
    assert (group.x_c, group.y_c) == pytest.approx((60.0, 50.0), rel=1e-12)
    assert group.I_p == pytest.approx(5_328_000.0, rel=1e-12)


def test_three_runs():
    """Areas 720, 720, 600 mm²: x_c = 86 400/2040 = 42.353 mm.

    I_p = 1440 (1200 + 17.647² + 50²) + 600 (100²/12 + 42.353²).
    """
    group = properties([HEEL, TOE, END])
    assert group.x_c == pytest.approx(86_400 / 2040, rel=1e-12)
    assert group.y_c == pytest.approx(50.0, rel=1e-12)
    by_hand = 1440 * (1200 + 17.6470588**2 + 2500) + 600 * (10_000 / 12 + 42.3529412**2)
    assert group.I_p == pytest.approx(by_hand, rel=1e-8)


def test_the_centroid_is_weighted_by_throat():
    """Throats 6 and 3 mm on equal lengths: a third of the way to the thinner."""
    group = properties([HEEL, Run("toe", 0, 100, 120, 100, LEG / 2)])
    assert group.y_c == pytest.approx(100 / 3, rel=1e-12)


def test_stress_through_the_centroid_is_even():
    group = properties([HEEL, TOE])
    for line in (None, 50.0):
        peak = elastic_stress(group, line)
        assert peak.along == pytest.approx(1 / 1440, rel=1e-12)
        assert peak.across == pytest.approx(0.0, abs=1e-18)
        assert peak.per_length == pytest.approx(1 / 240, rel=1e-12)


def test_peak_stress_of_an_eccentric_force():
    """Force at 20 mm from the heel: e = 30 mm, e/I_p = 30/5 328 000.

    At the heel's ends along = 1/1440 + 50·30/5 328 000, across = ∓60·30/5 328 000.
    """
    group = properties([TOE, HEEL])
    peak = elastic_stress(group, 20.0)
    assert peak.mark == "heel"
    assert (peak.x, peak.y) == pytest.approx((-60.0, -50.0), rel=1e-12)
    assert peak.along == pytest.approx(1 / 1440 + 1500 / 5_328_000, rel=1e-12)
    assert peak.across == pytest.approx(-1800 / 5_328_000, rel=1e-12)
    assert peak.size == pytest.approx(math.hypot(peak.along, peak.across), rel=1e-12)
    assert peak.per_length == pytest.approx(6.0 * peak.size, rel=1e-12)
    assert peak.throat == pytest.approx(6.0, rel=1e-12)
    above = elastic_stress(group, 80.0)
    assert above.mark == "toe"
    assert above.size == pytest.approx(peak.size, rel=1e-12)


def test_of_equal_ends_the_first_run_given_is_named():
    assert elastic_stress(properties([HEEL, TOE]), None).mark == "heel"
    assert elastic_stress(properties([TOE, HEEL]), None).mark == "toe"


def test_stress_at_a_point_between():
    group = properties([HEEL, TOE])
    along, across = stress_at(group, 20.0, 12.0, 7.0)
    assert along == pytest.approx(1 / 1440 - 7 * 30 / 5_328_000, rel=1e-12)
    assert across == pytest.approx(12 * 30 / 5_328_000, rel=1e-12)


@pytest.mark.parametrize(
    ("points", "leg", "words"),
    [
        ((0, 0, 0, 0), 6.0, r"run 'a': it starts and ends at \(0, 0\) mm"),
        ((0, 0, math.nan, 0), 6.0, "run 'a': points .*finite"),
        ((0, 0, 50, 0), 0.0, "run 'a': leg 0.0 mm; more than 0 mm"),
        ((0, 0, 50, 0), -6.0, "run 'a': leg -6.0 mm; more than 0 mm"),
        ((0, 0, 50, 0), math.nan, "run 'a': leg nan mm; more than 0 mm"),
    ],
)
def test_refused_runs(points, leg, words):
    with pytest.raises(InputError, match=words):
        Run("a", *points, leg)


def test_refused_groups():
    with pytest.raises(InputError, match="runs: none"):
        properties([])
    with pytest.raises(InputError, match="mark 'heel' stands twice"):
        properties([HEEL, HEEL])
    with pytest.raises(InputError, match="line_y: got nan"):
        elastic_stress(properties([HEEL, TOE]), math.nan)


# Balanced runs ------------------------------------------------------------------------------


def test_two_runs_in_the_ratio_of_the_levers():
    """Centroid 30 mm from the heel of a 100 mm leg: 70 % of the weld at the heel."""
    assert balanced_runs(30.0, 70.0, 400.0) == pytest.approx((280.0, 120.0), rel=1e-12)


def test_a_transverse_run_half_way_takes_half_from_each():
    """100 mm across the end: 50 mm less at the heel and at the toe."""
    found = balanced_runs(30.0, 70.0, 400.0, 100.0)
    assert found == pytest.approx((230.0, 70.0), rel=1e-12)


def test_a_short_transverse_run_beside_the_heel():
    """40 mm centred 25 mm up: moments about the heel 400·30 = 40·25 + 100 L_toe, L_toe = 110 mm."""
    found = balanced_runs(30.0, 70.0, 400.0, 40.0, 25.0)
    assert found == pytest.approx((250.0, 110.0), rel=1e-12)


def test_a_transverse_run_as_wide_as_the_leg_is_not_refused_for_rounding():
    """The levers add up to a hair less than the 100 mm of the run."""
    lever = 50.0 - 1e-13
    assert 2 * lever < 100.0
    assert balanced_runs(lever, lever, 400.0, 100.0) == pytest.approx((150.0, 150.0))


def test_a_transverse_run_that_just_leaves_the_toe_without_weld():
    """Moments about the heel: 100·50 = 30 L, L = 166.667 mm is the least total."""
    low, high = balanced_runs(30.0, 70.0, 500 / 3, 100.0)
    assert low == pytest.approx(200 / 3, rel=1e-12)
    assert high == pytest.approx(0.0, abs=1e-9)
    with pytest.raises(InputError, match=r"total: got 166 mm; at least 166.667 mm is due"):
        balanced_runs(30.0, 70.0, 166.0, 100.0)
    assert balanced_runs(30.0, 70.0, 166.667, 100.0)[1] >= 0.0


def test_a_transverse_run_that_would_leave_the_heel_with_less_than_no_weld():
    """At the heel's side of a centroid near the toe: moments about the toe, 100·50/20 = 250 mm."""
    with pytest.raises(InputError, match=r"at least 250.000 mm is due"):
        balanced_runs(80.0, 20.0, 249.0, 100.0)


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        ((0.0, 70.0, 400.0), "lever_low: got 0.0 mm; more than 0 mm"),
        ((30.0, -1.0, 400.0), "lever_high: got -1.0 mm; more than 0 mm"),
        ((30.0, 70.0, math.nan), "total: got nan mm; more than 0 mm"),
        ((30.0, 70.0, 400.0, -1.0), "transverse: got -1.0 mm; 0 to 100 mm"),
        ((30.0, 70.0, 400.0, 101.0), "transverse: got 101.0 mm; 0 to 100 mm"),
        ((30.0, 70.0, 400.0, 40.0, 15.0), "transverse_at: got 15.0 mm; 20 to 80 mm"),
        ((30.0, 70.0, 400.0, 40.0, 85.0), "transverse_at: got 85.0 mm; 20 to 80 mm"),
        ((30.0, 70.0, 400.0, 40.0, math.nan), "transverse_at: got nan mm"),
    ],
)
def test_refused_balances(arguments, words):
    with pytest.raises(InputError, match=words):
        balanced_runs(*arguments)
