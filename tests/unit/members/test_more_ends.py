"""Hangers, runs of weld, slotted tubes, gussets with an outline, pins and rods in a whole design.

Numbers by hand from the clauses, N and mm.
"""

from __future__ import annotations

from math import cos, hypot, pi, radians, sin, sqrt

import pytest

import tensionlib as tl
from tensionlib.errors import InputError
from tests.builders import bolted, gusset, member, tube

M20_CORE, M20_STRESS, F_UF = 225.0, 245.0, 830.0


def capacity(calc: tl.Calculation, part: str, name: str) -> float:
    return calc[part, name].capacity.internal


def demand(calc: tl.Calculation, part: str, name: str) -> float:
    return calc[part, name].demand.internal


# Hangers ----------------------------------------------------------------------------------


def hung(**changes):
    usual = {
        "bolts": "M20 8.8/TB",
        "number": 4,
        "gauge": "110 mm",
        "tributary": "80 mm",
        "thickness": "28 mm",
        "steel": "AS/NZS 3678 250",
    }
    hanger = tl.Hanger(**usual | changes)
    return tl.design(member(end=bolted(plate=gusset(hanger=hanger))), "250 kN")


def test_a_hanger_straight_up_is_in_tension_alone():
    calc = hung()
    assert demand(calc, "Hanger", "bolt tension") == pytest.approx(250e3 * 1.3 / 4)
    assert capacity(calc, "Hanger", "bolt tension") == pytest.approx(0.8 * M20_STRESS * F_UF)
    assert demand(calc, "Hanger", "flange in bending") == pytest.approx(250e3 / 4 * (110 - 12) / 2)
    # 28 mm is in the band from 12 to 50 mm: f_y 250.
    assert capacity(calc, "Hanger", "flange in bending") == pytest.approx(
        0.9 * 250 * 80 * 28**2 / 4
    )
    assert "bolt shear" not in {c.name for c in calc if c.part == "Hanger"}


def test_an_inclined_hanger_shears_and_pulls():
    calc = hung(angle="20 deg", threads="out of shear plane", prying=0.2)
    turn = radians(20)
    N, V = 250e3 * cos(turn) * 1.2 / 4, 250e3 * sin(turn) / 4
    N_c, V_c = 0.8 * M20_STRESS * F_UF, 0.8 * 0.62 * F_UF * 314.0
    assert demand(calc, "Hanger", "bolt tension") == pytest.approx(N)
    assert demand(calc, "Hanger", "bolt shear") == pytest.approx(V)
    assert capacity(calc, "Hanger", "bolt shear") == pytest.approx(V_c)
    together = calc["Hanger", "shear and tension together"]
    assert together.demand.internal == pytest.approx((N / N_c) ** 2 + (V / V_c) ** 2)
    assert together.capacity.internal == 1.0
    assert together.clause == "9.3.2.3"


@pytest.mark.parametrize(
    ("change", "says"),
    [
        ({"number": 3}, "number: got 3; an even number"),
        ({"angle": "88 deg"}, "angle: 85 degrees"),
        ({"threads": "cut"}, "threads: got 'cut'"),
        ({"steel": 250}, "steel: got 250; a name is due"),
    ],
)
def test_a_hanger_that_is_none_is_refused(change, says):
    with pytest.raises(InputError, match=says):
        hung(**change)


# Runs of weld -----------------------------------------------------------------------------


def test_runs_off_the_members_line_by_hand():
    """150x16 flat, 6 mm fillets of 200 and 100 along its edges: areas, moment and peak by hand."""
    runs = (
        tl.FilletRun("low", "0 mm", "0 mm", "200 mm", "0 mm", "6 mm"),
        tl.FilletRun("high", "0 mm", "150 mm", "100 mm", "150 mm", "6 mm"),
    )
    calc = tl.design(member("150x16 FL", tl.WeldedRuns("plate", runs, gusset())), "200 kN")
    a = 6 / sqrt(2)
    A = a * 300
    y_c, x_c = 150 * 100 / 300, (200 * 100 + 100 * 50) / 300
    I = a * (  # noqa: E741
        200**3 / 12
        + 200 * ((100 - x_c) ** 2 + y_c**2)
        + 100**3 / 12
        + 100 * ((50 - x_c) ** 2 + (150 - y_c) ** 2)
    )
    e = y_c - 75
    ends = [(0, 0), (200, 0), (0, 150), (100, 150)]
    peak = max(hypot(1 / A - e * (y - y_c) / I, e * (x - x_c) / I) * 200e3 for x, y in ends)
    check = calc["Welds", "weld, most stressed point"]
    assert check.demand.internal == pytest.approx(peak)
    assert check.capacity.internal == pytest.approx(0.8 * 0.6 * 480)
    # The shorter run spreads the force: 150 + 2·100·tan 30°.
    assert capacity(calc, "Gusset", "yield") == pytest.approx(
        0.9 * (150 + 200 / sqrt(3)) * 12 * 260
    )


def test_balanced_runs_leave_no_moment():
    section = tl.section("150x100x12 UA")
    heel, toe = tl.balanced_lengths(section, "long leg", "400 mm", "150 mm")
    assert heel.internal + toe.internal == pytest.approx(250.0)
    # Moments about the heel: toe's run at 150 and the end's at 75 against the centroid.
    assert toe.internal * 150 + 150 * 75 == pytest.approx(400 * section.y_c)
    runs = (
        tl.FilletRun("heel", "0 mm", "0 mm", heel, "0 mm", "6 mm"),
        tl.FilletRun("toe", "0 mm", "150 mm", toe, "150 mm", "6 mm"),
        tl.FilletRun("end", "0 mm", "0 mm", "0 mm", "150 mm", "6 mm"),
    )
    calc = tl.design(member(section, tl.WeldedRuns("long leg", runs, gusset())), "300 kN")
    assert calc.value("e_w").internal == pytest.approx(0.0, abs=1e-6)
    assert calc.value("tau_star").internal == pytest.approx(300e3 / (400 * 6 / sqrt(2)))


def test_legs_of_two_sizes_are_judged_by_the_smaller_and_the_larger():
    runs = (
        tl.FilletRun("low", "0 mm", "0 mm", "200 mm", "0 mm", "5 mm"),
        tl.FilletRun("high", "0 mm", "150 mm", "30 mm", "150 mm", "8 mm"),
    )
    calc = tl.design(member("150x16 FL", tl.WeldedRuns("plate", runs, gusset())), "50 kN")
    assert capacity(calc, "Weld limits", "least weld size") == 5.0
    assert demand(calc, "Weld limits", "greatest weld size") == 8.0
    assert demand(calc, "Weld limits", "least weld length") == 32.0
    assert not calc["Weld limits", "least weld length"].passes


@pytest.mark.parametrize(
    ("attempt", "says"),
    [
        (lambda: tl.WeldedRuns("slot", (), gusset()), "to: got 'slot'"),
        (lambda: tl.WeldedRuns("plate", (), gusset()), "runs: got"),
        (
            lambda: tl.FilletRun("a", "0 mm", "0 mm", "0 mm", "0 mm", "6 mm"),
            "run 'a': it starts and ends",
        ),
        (
            lambda: tl.balanced_lengths(tl.section("150x100x12 UA"), "long leg", "10 mm", "150 mm"),
            "total",
        ),
    ],
)
def test_runs_that_are_none_are_refused(attempt, says):
    with pytest.raises(InputError, match=says):
        attempt()


# Slotted tubes ----------------------------------------------------------------------------


def test_a_slotted_tubes_factor_by_the_length_of_its_welds():
    """114.3x4.8 CHS: x̄ = D/π = 36.38, l = 160: 0.7726 on the area less two slots of 14 mm."""
    calc = tl.design(tube(shear_lag_by_length=True, length_1="160 mm"), "200 kN")
    A_g = pi / 4 * (114.3**2 - (114.3 - 9.6) ** 2)
    factor = 1 - 114.3 / pi / 160
    assert capacity(calc, "Net section", "net section rupture") == pytest.approx(
        0.9 * 0.85 * factor * (A_g - 2 * 4.8 * 14) * 430
    )
    short = tl.design(tube(shear_lag_by_length=True, length_1="110 mm"), "200 kN")
    assert short.word == "NOT COVERED"


def test_a_square_tubes_centroid_off_the_gusset():
    calc = tl.design(tube("100x100x5.0 SHS", shear_lag_by_length=True, length_1="150 mm"), "200 kN")
    x = (100**2 + 2 * 100 * 100) / (4 * 200)
    assert calc.value("k_te").internal == pytest.approx(1 - x / 150)


def test_a_factor_may_be_stated_or_asked_for_not_both():
    with pytest.raises(InputError, match="shear_lag_by_length: it is for an end welded to 'slot'"):
        tube(shear_lag_by_length=True, k_te=0.8, k_te_reason="test")


# Gussets with an outline ------------------------------------------------------------------


def outlined(**changes):
    shape = tl.GussetShape(
        [("0 mm", "0 mm"), ("400 mm", "0 mm"), ("400 mm", "240 mm"), ("0 mm", "240 mm")],
        (3,),
        ("120 mm", "90 mm"),
        "0 deg",
    )
    plate = gusset(**{"shape": shape} | changes)
    return tl.design(member("150x12 FL", bolted(to="plate", gauge=None, plate=plate)), "150 kN")


def test_the_outline_cuts_the_width_and_gives_the_edges():
    """Bolts at 40, 110, 180; the spread of 80.8 each side meets no edge at 90 and 150."""
    calc = outlined()
    width = 2 * 140 / sqrt(3)
    assert capacity(calc, "Gusset", "yield") == pytest.approx(0.9 * width * 12 * 260)
    # The gusset's end is at 400 - 120 = 280, 100 beyond the last bolt; its side at 90 is nearer.
    assert capacity(calc, "Bolt distances", "least edge distance, gusset edge") == 90.0
    # Block: shear 100 + 140, tension to the nearer side edge 90.
    gv, nv, nt = 240 * 12, (240 - 2.5 * 22) * 12, (90 - 11) * 12
    assert capacity(calc, "Gusset", "block shear") == pytest.approx(
        0.75 * (min(0.6 * 410 * nv, 0.6 * 260 * gv) + 410 * nt)
    )
    assert calc["Gusset", "free edge"].demand.internal == 400.0


def test_compression_of_the_strip_by_hand():
    """Free length 120 + 40 = 160 back to the support, 1.2 of it: the column curve of 6.3.3."""
    calc = outlined(compression="60 kN")
    n = 1.2 * 160 * sqrt(12) / 12 * sqrt(260 / 250)
    c = n + 0.5 * 2100 * (n - 13.5) / (n * n - 15.3 * n + 2050)
    xi = ((c / 90) ** 2 + 1 + 0.00326 * (c - 13.5)) / (2 * (c / 90) ** 2)
    alpha = xi * (1 - sqrt(1 - (90 / (xi * c)) ** 2))
    area = 2 * 140 / sqrt(3) * 12
    assert capacity(calc, "Gusset", "compression when the force reverses") == pytest.approx(
        0.9 * alpha * area * 260
    )
    assert demand(calc, "Gusset", "compression when the force reverses") == 60e3


def test_a_free_length_may_be_stated_and_must_be_known():
    plain = gusset(compression="60 kN")
    without = tl.design(member(end=bolted(plate=plain)), "150 kN")
    assert without.word == "NOT COVERED"
    stated = tl.design(
        member(end=bolted(plate=plain.but(free_length="150 mm", length_factor=1.0))), "150 kN"
    )
    assert stated.value("lambda_n").internal == pytest.approx(150 * sqrt(12) / 12 * sqrt(260 / 250))


def test_the_weld_to_the_support_by_hand():
    """Left edge of 240, the line 30 off its middle: N/2L and 3Ne/L² square to the edge."""
    calc = outlined(support_leg="6 mm")
    v = 150e3 / 480 + 3 * 150e3 * 30 / 240**2
    assert demand(calc, "Gusset", "weld to the support") == pytest.approx(v)
    assert capacity(calc, "Gusset", "weld to the support") == pytest.approx(
        0.8 * 0.6 * 480 * 6 / sqrt(2)
    )


def test_two_supports_are_not_shared_out():
    shape = tl.GussetShape(
        [("0 mm", "0 mm"), ("400 mm", "0 mm"), ("400 mm", "240 mm"), ("0 mm", "240 mm")],
        (0, 3),
        ("120 mm", "90 mm"),
        "30 deg",
    )
    calc = outlined(shape=shape, support_leg="6 mm")
    assert [line.title for line in calc.not_covered] == ["weld to the supports"]


# Pins and rods ----------------------------------------------------------------------------


def test_a_pinned_tie_by_hand():
    end = tl.Pinned(
        "40 mm",
        "350 MPa",
        "41 mm",
        "75 mm",
        gusset(thickness="16 mm", width="150 mm"),
        "75 mm",
        eye_width="170 mm",
    )
    calc = tl.design(member("130x20 FL", end), "250 kN")
    assert capacity(calc, "Pin", "pin shear") == pytest.approx(0.8 * 0.62 * 350 * 2 * 0.7854 * 1600)
    assert capacity(calc, "Pin", "bearing on the pin, eye") == pytest.approx(
        0.8 * 1.4 * 350 * 40 * 20
    )
    assert demand(calc, "Pin", "pin bending") == pytest.approx(250e3 * (20 + 8 + 32) / 8)
    assert capacity(calc, "Pin", "pin bending") == pytest.approx(0.8 * 350 * 40**3 / 6)
    assert capacity(calc, "Net section", "net section rupture") == pytest.approx(
        0.9 * 0.85 * (170 - 41) * 20 * 440
    )
    assert calc["Pin", "pin shear"].clause == "9.5.1"
    newer = tl.design(member("130x20 FL", end), "250 kN", standard="AS 4100:2020")
    assert newer["Pin", "pin shear"].clause == "9.4.1"
    turning = tl.design(member("130x20 FL", end.but(rotates=True)), "250 kN")
    assert capacity(turning, "Pin", "bearing on the pin, eye") == pytest.approx(
        0.5 * capacity(calc, "Pin", "bearing on the pin, eye")
    )


def test_a_bracing_rod_with_a_turnbuckle_is_connected_for_its_own_capacity():
    end = tl.Threaded(
        "M24",
        "130 kN",
        "the maker's certificate",
        "24 mm",
        "26 mm",
        gusset(thickness="16 mm", width="90 mm"),
        "50 mm",
        coupling="turnbuckle",
    )
    calc = tl.design(member("24 RB", end), "40 kN")
    own = min(0.9 * pi / 4 * 24**2 * 300, 0.9 * 0.85 * 353 * 440)
    assert calc.value("N_star_c").internal == pytest.approx(own)
    hanging = tl.design(member("24 RB", end.but(bracing=False)), "40 kN")
    assert hanging.value("N_star_c").internal == pytest.approx(max(40e3, 0.3 * own))
    assert calc["Rod and fittings", "fork and turnbuckle"].note.startswith("certified: the maker")


# The detailing report ---------------------------------------------------------------------


def test_the_detailing_report_holds_every_limit_and_no_strength():
    calc = tl.design(member(end=bolted()), "250 kN")
    report = calc.detailing()
    names = {(row["part"], row["name"]) for row in report.record["checks"]}
    assert ("Bolt distances", "least pitch") in names
    assert ("Bolts as bought", "socket clear of the other leg") in names
    assert ("Bolts", "bolt shear") not in names
    assert report.passes
    assert "common practice" in str(report)
    assert "9.6.1" in str(report)
    assert "<table" in report._repr_html_()
    short = tl.design(member(end=bolted(end_distance="30 mm")), "250 kN")
    assert not short.detailing().passes


def test_a_lap_is_five_of_the_thinner_part_and_25_mm_at_least():
    """9.5 mm leg on 12 mm: 47.5 mm; a 4 mm gusset: 25 mm."""
    from tests.builders import welded

    calc = tl.design(member(end=welded()), "100 kN")
    assert calc["lap"].demand.internal == pytest.approx(47.5)
    assert calc["lap"].capacity.internal == 150.0
    thin = tl.design(member(end=welded(plate=gusset(thickness="4 mm"))), "100 kN")
    assert thin["lap"].demand.internal == 25.0
