"""Threaded rods: formulas, the walk on hand-made inputs, and a whole design; figures by hand.

The walk's end: M24 (A_s 353) on a rod of f_u 440, certified fittings of 130 kN, a 24 mm pin in a
26 mm hole, 50 mm from the end of a lug 16 mm thick and 100 mm wide (250, 410), N*_c = 100 kN.
"""

from __future__ import annotations

import math
from dataclasses import replace
from math import inf

import pytest

import tensionlib as tl
from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.calculation.sheet import CheckLine
from tensionlib.calculation.tables import Band, ThresholdTable
from tensionlib.calculation.working import Working
from tensionlib.errors import InputError
from tensionlib.standards.as4100.notation import AS_2020
from tensionlib.standards.as4100.rules import RULES_2020
from tensionlib.standards.common_as_nzs import rods
from tensionlib.standards.common_as_nzs.walk_rod import rod_end, thread_area
from tensionlib.standards.nzs3404.notation import NZS
from tensionlib.standards.nzs3404.rules import RULES
from tests.builders import SECTION_STEEL, TUBE_STEEL, gusset, member

WALKS = [
    pytest.param(RULES, NZS, id="NZS 3404"),
    pytest.param(RULES_2020, AS_2020, id="AS 4100"),
]


def table(name, value):
    return ThresholdTable(name, "by hand", {"steel": (Band(inf, True, value),)}), "steel"


def numbers(**values):
    return {name: Number(float(value), "by hand") for name, value in values.items()}


def sleeve(f_y=280.0, f_u=440.0, **changes):
    """45 mm outside, 30 mm of thread each side."""
    own = numbers(**{"d_sl": 45, "l_en": 30} | changes)
    return Inputs({}, own, {"f_y": table("f_y", f_y), "f_u": table("f_u", f_u)}, "sleeve: ")


def end(*, with_sleeve=None, lug=None, **changes):
    """The end of this file's docstring with some numbers changed."""
    own = {"A_s": 353, "d_th": 24, "R_f": 130e3, "d_p": 24, "d_hp": 26, "t_p": 16}
    lug = {"n_f": 1, "w_e": 100, "e_e": 50} | (lug or {})
    return Inputs(
        {"label": "", "kind": "rod", "earthquake": "no", "certified": "certified: sheet 12"},
        numbers(**own | changes),
        {"f_yp": table("f_yp", 250.0), "f_up": table("f_up", 410.0)},
        "end: ",
        {
            "fork": (Inputs({}, numbers(**lug), {}, "lug: "),),
            "sleeve": () if with_sleeve is None else (with_sleeve,),
        },
    )


def walked(inputs, rules=RULES, notation=NZS, force="100 kN"):
    work = Working("Connection", notation)
    N_c, f_u = work.given("N_star_c", force), work.given("f_u", "440 MPa")
    rod_end(rules, work, inputs, N_c, f_u)
    return work


def checks(work):
    """Demand, capacity and clause of each check by (part, name)."""
    return {
        (line.part, line.title): (work.values[line.demand], work.values[line.capacity], line.clause)
        for line in work.lines
        if isinstance(line, CheckLine)
    }


# By hand. Thread 0.8·353·440; lug: a_e = 50 - 13 + 12 = 49, tear-out 49·16·410 = 321 440, less
# than bearing 3.2·24·16·410; A_req = 100e3/(0.9·250); beyond (50 - 13)·16; across (100 - 26)·16.
DUE = {
    ("Rod and fittings", "thread in tension"): (100e3, 124_256.0, "9.3.2.2"),
    ("Rod and fittings", "fork and turnbuckle"): (100e3, 130e3, "practice"),
    ("Lug", "ply bearing and tear-out"): (100e3, 0.9 * 321_440, "9.5.4"),
    ("Lug", "thickness beside the hole"): (9.25, 16.0, "7.5"),
    ("Lug", "area beyond the hole"): (444.4444, 592.0, "7.5"),
    ("Lug", "area across the hole"): (591.1111, 1184.0, "7.5"),
}


@pytest.mark.parametrize(("rules", "notation"), WALKS)
def test_every_check_of_a_rod(rules, notation):
    found = checks(walked(end(), rules, notation))
    assert list(found) == list(DUE)
    for key, (demand, capacity, clause) in DUE.items():
        assert found[key][0] == pytest.approx(demand, rel=1e-6), key
        assert found[key][1] == pytest.approx(capacity, rel=1e-6), key
        assert found[key][2] == notation.cite(clause), key


def test_clause_of_the_edition_of_2020():
    found = checks(walked(end(), RULES_2020, AS_2020))
    assert found["Rod and fittings", "thread in tension"][2] == "9.2.2.2"


def test_who_certifies_the_fittings_stands_beside_the_check():
    (line,) = [x for x in walked(end()).lines if x.title == "fork and turnbuckle"]
    assert line.note == "certified: sheet 12"


def test_a_sleeve_by_its_ring():
    """0.7854(45² - 24²) = 1138.05; yield 0.9·1138.05·280, fracture 0.9·0.85·1138.05·440."""
    found = checks(walked(end(with_sleeve=sleeve())))
    ring = math.pi / 4 * (45**2 - 24**2)
    assert ring == pytest.approx(1138.04, abs=0.01)
    part = "Rod and fittings"
    assert found[part, "sleeve"][1] == pytest.approx(0.9 * ring * 280, rel=3e-6)
    assert found[part, "sleeve, fracture"][1] == pytest.approx(0.9 * 0.85 * ring * 440, rel=3e-6)
    assert found[part, "thread in the sleeve"] == (24.0, 30.0, "practice")
    assert found.keys() - DUE.keys() == {
        (part, name) for name in ("sleeve", "sleeve, fracture", "thread in the sleeve")
    }


def test_fracture_governs_a_sleeve_of_high_yield():
    """f_y 450 and f_u 500: 0.85·500 = 425 < 450."""
    found = checks(walked(end(with_sleeve=sleeve(450.0, 500.0))))
    part = "Rod and fittings"
    assert found[part, "sleeve, fracture"][1] < found[part, "sleeve"][1]


def test_thread_in_a_sleeve_is_due_one_diameter():
    found = checks(walked(end(with_sleeve=sleeve(l_en=23.9))))
    demand, capacity, _ = found["Rod and fittings", "thread in the sleeve"]
    assert demand > capacity


def test_capacity_factors_are_those_of_the_rules():
    odd = replace(RULES, factors=replace(RULES.factors, bolt=0.4, member=0.45))
    usual = checks(walked(end(with_sleeve=sleeve())))
    found = checks(walked(end(with_sleeve=sleeve()), odd))
    part = "Rod and fittings"
    for name in ("thread in tension", "sleeve", "sleeve, fracture"):
        assert found[part, name][1] == pytest.approx(usual[part, name][1] / 2)
    assert found[part, "fork and turnbuckle"] == usual[part, "fork and turnbuckle"]


def test_net_area_is_the_stress_area_of_the_thread():
    work = Working("Net section", NZS)
    entry = thread_area(work, end())
    assert work.values[entry.index] == 353.0
    assert (entry.symbol.name, entry.symbol.role.name) == ("A_s", "area")


def test_what_is_left_out_is_said():
    assert any("lug away" in text for text in walked(end()).not_checked)


def test_symbols_print_unlike_those_of_either_standard():
    for notation in (NZS, AS_2020):
        pictures = {symbol.latex: symbol.name for symbol in notation}
        for symbol in rods.RODS:
            assert pictures.get(symbol.latex, symbol.name) == symbol.name


# A whole design ---------------------------------------------------------------------------


def threaded(**changes):
    usual = {
        "thread": "M24",
        "fork_capacity": "130 kN",
        "certified_by": "test certificate 7",
        "pin": "24 mm",
        "hole": "26 mm",
        "plate": gusset(thickness="16 mm", width="100 mm"),
        "plate_edge_beyond": "50 mm",
    }
    return tl.Threaded(**usual | changes)


def with_sleeve(**changes):
    usual = {
        "coupling": "sleeve",
        "sleeve_diameter": "45 mm",
        "sleeve_steel": SECTION_STEEL,
        "engagement": "30 mm",
    }
    return threaded(**usual | changes)


def rod(end, force="60 kN", **more):
    return tl.design(member("24 RB", end), force, **more)


@pytest.mark.parametrize("standard", ["NZS 3404", "AS 4100"])
def test_the_thread_is_proven_as_a_section_and_as_a_fastener(standard):
    """24 RB of 300: 0.9·π/4·24²·300 = 122.15 kN; 7.2 on A_s 0.9·0.85·353·440 = 118.82 kN, the
    least; 9.3.2.2 0.8·353·440 = 124.26 kN."""
    calc = rod(threaded(), standard=standard)
    assert calc["gross section yield"].capacity.internal == pytest.approx(
        0.9 * math.pi / 4 * 576 * 300, rel=1e-4
    )
    assert calc["net section rupture"].capacity.internal == pytest.approx(118_819.8)
    assert calc["thread in tension"].capacity.internal == pytest.approx(124_256)


@pytest.mark.parametrize(
    ("coupling", "bracing", "action"),
    [
        ("turnbuckle", True, 118_819.8),
        ("turnbuckle", False, 60e3),
        ("none", True, 60e3),
    ],
)
def test_a_brace_with_a_turnbuckle_is_designed_for_its_own_capacity(coupling, bracing, action):
    """9.1.4: φN_t = 118.8 kN; otherwise the greater of 60 kN and 0.3·118.8 = 35.6 kN."""
    calc = rod(threaded(coupling=coupling, bracing=bracing))
    assert calc["thread in tension"].demand.internal == pytest.approx(action)
    assert calc["fork and turnbuckle"].demand.internal == pytest.approx(action)
    assert calc["area beyond the hole"].demand.internal == pytest.approx(action / 225)


def test_one_end_with_a_turnbuckle_rules_both():
    far = threaded(plate_edge_beyond="60 mm")
    calc = tl.design(member("24 RB", threaded(coupling="turnbuckle"), far_end=far), "60 kN")
    demands = [c.demand.internal for c in calc.checks if c.name == "thread in tension"]
    assert demands == [pytest.approx(118_819.8)] * 2


def test_fittings_weaker_than_the_rod_fail_a_brace():
    calc = rod(threaded(coupling="turnbuckle", fork_capacity="110 kN"))
    assert calc["fork and turnbuckle"].verdict == "fail"
    assert calc.word == "FAIL"
    assert rod(threaded(fork_capacity="110 kN")).word == "PASS"


def test_least_action_is_three_tenths_of_the_capacity():
    calc = rod(threaded(), force="10 kN")
    assert calc["thread in tension"].demand.internal == pytest.approx(0.3 * 118_819.8)


def test_a_sleeve_in_a_design():
    """Bar of 300 at 45 mm: f_y 280; φN = 0.9·1138.04·280 = 286.8 kN."""
    calc = rod(with_sleeve())
    assert calc["sleeve"].capacity.internal == pytest.approx(286_787, rel=3e-5)
    assert calc["thread in the sleeve"].verdict == "pass"
    short = rod(with_sleeve(engagement="20 mm"))
    assert short["thread in the sleeve"].verdict == "fail"
    tube = rod(with_sleeve(sleeve_steel=TUBE_STEEL))
    assert tube["sleeve"].capacity.internal == pytest.approx(286_787 * 350 / 280, rel=3e-5)


def test_a_bar_thinner_than_its_thread_is_refused():
    with pytest.raises(InputError, match="thread: got M24 on 20 RB"):
        tl.design(member("20 RB", threaded()), "10 kN")
