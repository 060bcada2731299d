"""Pinned ends: formulas, the walk on hand-made inputs, and a whole design; figures by hand.

The walk's end: eye of a 150x20 flat (f_y 280, f_u 440) with a 41 mm hole 80 mm from its end, on a
40 mm pin of f_y 350 between two 16 mm forks 160 mm wide (250, 410) 2 mm off, N*_c = 200 kN.
"""

from __future__ import annotations

import math
from dataclasses import replace
from math import inf

import numpy as np
import pytest

import tensionlib as tl
from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.calculation.sheet import CheckLine, Fixed
from tensionlib.calculation.tables import Band, ThresholdTable
from tensionlib.calculation.working import Working
from tensionlib.standards.as4100.notation import AS_1998, AS_2020
from tensionlib.standards.as4100.rules import RULES_2020
from tensionlib.standards.common_as_nzs import pins
from tensionlib.standards.common_as_nzs.walk_pinned import eye_net_area, pinned_end
from tensionlib.standards.nzs3404.notation import NZS
from tensionlib.standards.nzs3404.rules import RULES
from tests.builders import gusset, member

WALKS = [
    pytest.param(RULES, NZS, id="NZS 3404"),
    pytest.param(RULES_2020, AS_2020, id="AS 4100"),
]


def table(name, value):
    return ThresholdTable(name, "by hand", {"plate": (Band(inf, True, value),)}), "plate"


def numbers(**values):
    return {name: Number(float(value), "by hand") for name, value in values.items()}


def end(*, rotates="no", label="", eye=None, fork=None, **changes):
    """The end of this file's docstring with some numbers changed."""
    own = {"t": 20, "t_p": 16, "d_p": 40, "d_hp": 41, "f_ypin": 350, "n_sp": 2, "c_p": 2}
    eye = {"n_f": 1, "w_e": 150, "e_e": 80} | (eye or {})
    fork = {"n_f": 2, "w_e": 160, "e_e": 80} | (fork or {})
    return Inputs(
        {"label": label, "kind": "pinned", "rotates": rotates, "earthquake": "no"},
        numbers(**own | changes),
        {"f_yp": table("f_yp", 250.0), "f_up": table("f_up", 410.0)},
        "end: ",
        {
            "eye": (Inputs({}, numbers(**eye), {}, "eye: "),),
            "fork": (Inputs({}, numbers(**fork), {}, "fork: "),),
        },
    )


def walked(inputs, rules=RULES, notation=NZS, force="200 kN"):
    work = Working("Connection", notation)
    N_c = work.given("N_star_c", force)
    f_y, f_u = work.given("f_y", "280 MPa"), work.given("f_u", "440 MPa")
    pinned_end(rules, work, inputs, N_c, f_y, f_u)
    return work


def checks(work):
    """Demand, capacity, clause and kind of each check by (part, name)."""
    return {
        (line.part, line.title): (
            work.values[line.demand],
            work.values[line.capacity],
            line.clause,
            line.kind,
        )
        for line in work.lines
        if isinstance(line, CheckLine)
    }


# By hand. Pin: A 0.7854·40² = 1256.64, V_f 0.62·350·2·1256.64 = 545 381.8 (φ 0.80);
# S = 40³/6, M* = 200e3(20 + 4·2 + 2·16)/8 = 1.5e6. Eye: a_e = 80 - 20.5 + 20 = 79.5, tear-out
# 79.5·20·440 = 699 600, less than bearing 3.2·40·20·440 (φ 0.90); A_req = 200e3/(0.9·280).
DUE = {
    ("Pin", "pin shear"): (200e3, 436_305.4, "9.5.1"),
    ("Pin", "bearing on the pin, eye"): (200e3, 0.8 * 392_000, "9.5.2"),
    ("Pin", "bearing on the pin, fork plates"): (200e3, 0.8 * 627_200, "9.5.2"),
    ("Pin", "pin bending"): (1.5e6, 2_986_666.7, "9.5.3"),
    ("Eye", "ply bearing and tear-out"): (200e3, 629_640.0, "9.5.4"),
    ("Eye", "thickness beside the hole"): (13.625, 20.0, "7.5"),
    ("Eye", "area beyond the hole"): (793.651, 1190.0, "7.5"),
    ("Eye", "area across the hole"): (1055.556, 2180.0, "7.5"),
    ("Fork plates", "ply bearing and tear-out"): (200e3, 938_736.0, "9.5.4"),
    ("Fork plates", "thickness beside the hole"): (14.875, 16.0, "7.5"),
    ("Fork plates", "area beyond the hole"): (888.889, 1904.0, "7.5"),
    ("Fork plates", "area across the hole"): (1182.222, 3808.0, "7.5"),
}


@pytest.mark.parametrize(("rules", "notation"), WALKS)
def test_every_check_of_a_pinned_end(rules, notation):
    found = checks(walked(end(), rules, notation))
    assert list(found) == list(DUE)
    for key, (demand, capacity, clause) in DUE.items():
        assert found[key][0] == pytest.approx(demand, rel=1e-6), key
        assert found[key][1] == pytest.approx(capacity, rel=1e-6), key
        assert found[key][2] == notation.cite(clause), key


def test_clauses_of_the_edition_of_2020_are_one_lower():
    found = checks(walked(end(), RULES_2020, AS_2020))
    assert found["Pin", "pin shear"][2] == "9.4.1"
    assert found["Eye", "ply bearing and tear-out"][2] == "9.4.4"
    assert found["Eye", "area beyond the hole"][2] == "7.5"
    assert checks(walked(end(), RULES_2020, AS_1998))["Pin", "pin shear"][2] == "9.5.1"


def test_only_the_thickness_is_detailing():
    kinds = {name: kind for (_, name), (*_, kind) in checks(walked(end())).items()}
    assert {n for n, kind in kinds.items() if kind == "detailing"} == {"thickness beside the hole"}
    assert {n for n, k in kinds.items() if k == "strength"} == kinds.keys() - {
        "thickness beside the hole"
    }


def test_a_pin_that_rotates_bears_half():
    """k_p = 0.5: 156.8 kN on the eye, below the 200 kN; nothing else changes."""
    still, turns = checks(walked(end())), checks(walked(end(rotates="yes")))
    assert turns["Pin", "bearing on the pin, eye"][1] == pytest.approx(156_800)
    assert turns["Pin", "bearing on the pin, fork plates"][1] == pytest.approx(250_880)
    same = {key for key in still if still[key] == turns[key]}
    assert still.keys() - same == {
        ("Pin", "bearing on the pin, eye"),
        ("Pin", "bearing on the pin, fork plates"),
    }


def test_bearing_of_the_ply_governs_where_the_end_is_long():
    """e_e 200: a_e = 199.5 > 3.2·40 = 128, so φV = 0.9·128·20·440."""
    found = checks(walked(end(eye={"e_e": 200, "w_e": 400})))
    assert found["Eye", "ply bearing and tear-out"][1] == pytest.approx(0.9 * 128 * 20 * 440)


def test_area_required_by_fracture_where_the_strength_is_low():
    """f_y 400 and f_u 420: 200e3/(0.9·0.85·420) = 622.47 > 200e3/(0.9·400) = 555.56."""
    assert pins.required_area(200e3, 0.9, 400.0, 420.0) == pytest.approx(622.47, abs=0.01)
    assert pins.required_area(200e3, 0.9, 280.0, 440.0) == pytest.approx(793.65, abs=0.01)


def test_capacity_factors_are_those_of_the_rules():
    """Pin, ply and member each by its own factor of the table."""
    odd = replace(RULES, factors=replace(RULES.factors, pin=0.4, ply=0.3, member=0.45))
    usual, found = checks(walked(end())), checks(walked(end(), odd))
    for (part, name), (demand, capacity, *_) in found.items():
        was = usual[part, name]
        if part == "Pin":
            assert (demand, capacity) == (was[0], pytest.approx(was[1] / 2))
        elif name == "ply bearing and tear-out":
            assert capacity == pytest.approx(was[1] / 3)
        elif name.startswith("area"):
            assert (demand, capacity) == (pytest.approx(was[0] * 2), was[1])


def test_the_factors_of_both_standards():
    """Tables 3.4 and 3.3(1): pin 0.80, ply at a pin 0.90."""
    for rules, notation in ((RULES, NZS), (RULES_2020, AS_2020)):
        work = walked(end(), rules, notation)
        found = {line.note: line.value for line in work.lines if isinstance(line, Fixed)}
        assert found["pin"] == 0.80
        assert found["ply in bearing at a pin"] == 0.90
        assert found["member in tension"] == 0.90


def test_all_forces_double_with_the_action():
    once, twice = checks(walked(end())), checks(walked(end(), force="400 kN"))
    for key, (demand, capacity, _, kind) in once.items():
        assert twice[key][1] == capacity
        assert twice[key][0] == pytest.approx(demand if kind == "detailing" else 2 * demand)


def test_two_ends_stand_side_by_side():
    """Labels keep the parts of two ends apart; one working takes both."""
    work = Working("Connection", NZS)
    N_c = work.given("N_star_c", "200 kN")
    f_y, f_u = work.given("f_y", "280 MPa"), work.given("f_u", "440 MPa")
    for i in (1, 2):
        one = end(label=f"End {i}: ")
        parts = {
            name: (Inputs({}, part._numbers, {}, f"end {i}: {name}: "),)
            for name, (part,) in one.parts.items()
        }
        pinned_end(RULES, work, replace(one, prefix=f"end {i}: ", parts=parts), N_c, f_y, f_u)
    assert len(checks(work)) == 2 * len(DUE)
    assert {part for part, _ in checks(work)} == {
        f"End {i}: {part}" for i in (1, 2) for part in ("Pin", "Eye", "Fork plates")
    }


def test_what_is_assumed_and_left_out_is_said():
    work = walked(end())
    assert any("end square" in text for text in work.assumptions)
    assert any("fork plates away" in text for text in work.not_checked)
    assert any("taper" in text for text in work.not_checked)


def test_net_area_of_the_eye():
    """(150 - 41)·20 = 2180 mm²."""
    work = Working("Net section", NZS)
    entry = eye_net_area(work, end())
    assert work.values[entry.index] == 2180.0
    assert entry.symbol.name == "A_n"


# Statics ----------------------------------------------------------------------------------


@pytest.mark.parametrize(("t", "gap", "t_p"), [(20, 2, 16), (40, 0, 10), (12, 6, 25)])
def test_moment_of_the_pin_is_that_of_its_pressures(t, gap, t_p):
    """Cut at mid-eye: half the force over each fork, less half of it over half the eye."""
    N, n = 200e3, 200_001
    fork = np.linspace(t / 2 + gap, t / 2 + gap + t_p, n)
    eye = np.linspace(0.0, t / 2, n)
    due = np.mean(fork) * N / 2 - np.mean(eye) * N / 2
    assert pins.pin_moment(N, float(t), float(gap), float(t_p)) == pytest.approx(due, rel=1e-9)


def test_plastic_modulus_of_the_pin():
    """d³/6 against the sum of |y| dA over the circle: 10 667 mm³ of a 40 mm pin."""
    y = np.linspace(-20.0, 20.0, 400_001)
    due = np.trapezoid(np.abs(y) * 2 * np.sqrt(np.maximum(400.0 - y * y, 0.0)), y)
    assert pins.pin_modulus(40.0) == pytest.approx(due, rel=1e-6)


def test_area_of_the_pin():
    assert pins.pin_area(40.0) == pytest.approx(math.pi * 400, rel=3e-6)


@pytest.mark.parametrize(("w_e", "e_e"), [(150, 80), (150, 120), (100, 140), (160, 160)])
def test_least_distance_beyond_the_hole_within_45_degrees(w_e, e_e):
    """Every line from the hole's centre to the outline of a square end, within 45° of the force."""
    angles = np.linspace(-np.pi / 4, np.pi / 4, 2001)
    sides = (w_e / 2) / np.maximum(np.abs(np.sin(angles)), 1e-12)
    due = np.minimum(sides, e_e / np.cos(angles)).min()
    found = checks(walked(end(eye={"w_e": w_e, "e_e": e_e})))["Eye", "area beyond the hole"][1]
    assert found == pytest.approx((due - 20.5) * 20, rel=1e-9)


def test_the_side_governs_beyond_the_hole_of_a_long_narrow_eye():
    """w_e 100, e_e 140: 100/√2 - 20.5 = 50.21, not 119.5."""
    found = checks(walked(end(eye={"w_e": 100, "e_e": 140})))["Eye", "area beyond the hole"][1]
    assert found == pytest.approx(1004.21, abs=0.01)


def test_symbols_print_unlike_those_of_either_standard():
    """A sheet holds both: each symbol of a pin has a name and a picture of its own."""
    for notation in (NZS, AS_2020):
        pictures = {symbol.latex: symbol.name for symbol in notation}
        for symbol in pins.PINS:
            assert pictures.get(symbol.latex, symbol.name) == symbol.name


# A whole design ---------------------------------------------------------------------------


def pinned(**changes):
    usual = {
        "pin": "40 mm",
        "pin_f_y": "350 MPa",
        "hole": "41 mm",
        "edge_beyond": "80 mm",
        "plate": gusset(thickness="16 mm", width="160 mm"),
        "plate_edge_beyond": "80 mm",
        "gap": "2 mm",
    }
    return tl.Pinned(**usual | changes)


def test_a_flat_with_two_eyes():
    """150x20 FL of 300 (f_y 280): yield 0.9·3000·280 = 756 kN, net 0.9·0.85·2180·440 = 733.8 kN.

    N*_c is then 0.3·733.8 = 220.1 kN, more than the 200 kN; k_te 1.0.
    """
    calc = tl.design(member("150x20 FL", pinned()), "200 kN")
    assert calc["gross section yield"].capacity.internal == pytest.approx(756e3)
    assert calc["net section rupture"].capacity.internal == pytest.approx(733_788)
    assert calc.value("k_te").internal == 1.0
    assert calc["pin shear"].demand.internal == pytest.approx(0.3 * 733_788)
    assert calc["pin shear"].capacity.internal == pytest.approx(436_305.4, rel=1e-6)
    assert calc["bearing on the pin, eye"].verdict == "pass"
    assert calc.word == "PASS"


def test_an_eye_wider_than_its_flat():
    """100x20 FL with an eye of 160 mm: net (160 - 41)·20, gross still the flat's 2000."""
    calc = tl.design(member("100x20 FL", pinned(eye_width="160 mm")), "200 kN")
    assert calc.value("A_n").internal == 2380.0
    assert calc["gross section yield"].capacity.internal == pytest.approx(0.9 * 2000 * 280)


def test_a_pin_too_thin_fails():
    calc = tl.design(member("150x20 FL", pinned(pin="24 mm", hole="25 mm")), "200 kN")
    assert calc["pin bending"].verdict == "fail"
    assert calc.word == "FAIL"


def test_a_thin_eye_fails_its_proportions():
    """200x10 FL: (200 - 41)/8 = 19.9 mm of thickness is due beside the hole, 10 is there."""
    calc = tl.design(member("200x10 FL", pinned()), "50 kN", standard="AS 4100")
    check = next(c for c in calc.checks if c.name == "thickness beside the hole")
    assert check.demand.internal == pytest.approx(19.875)
    assert (check.capacity.internal, check.verdict) == (10.0, "fail")
