"""Tension with bending, sag, stretch and ties of a member; figures by hand.

150x12 flat lying, 4 m long: A 1800, 7850·1800e-6 = 14.13 kg/m, w_g = 0.1386153 N/mm,
Z_x = 150·12²/6 = 3600, Z_y = 12·150²/6 = 45 000 mm³, I_x = 150·12³/12 = 21 600 mm⁴, f_y 300 MPa.
One line of M20 in it: φN_t = 0.9·1800·300 = 486 kN, below 0.9·0.85·(1800 - 264)·440 = 517 kN.
"""

from __future__ import annotations

import math
from typing import Any

import pytest

import tensionlib as tl
from tensionlib import Across
from tensionlib.standards.common_as_nzs import bending
from tensionlib.steel.moduli import elastic_moduli
from tests.builders import bolted, gusset, member, tube

PART = "Tension with bending"
W_G = 1800 * 7850e-9 * 9.81
M_W = 1.2 * W_G * 4000**2 / 8  # 332 677 Nmm
PHI_M_X, PHI_M_Y = 0.9 * 300 * 3600, 0.9 * 300 * 45_000


def flat(across: Across | None, **changes: Any) -> tl.Member:
    end = bolted(to="plate", gauge=None)
    return member("150x12 FL", end, across=across, **changes)


def design(
    across: Across | None, force: str = "100 kN", *, service: str | None = None, **changes: Any
) -> tl.Calculation:
    return tl.design(flat(across, **changes), force, service=service)


def angle(across: Across, section: str = "150x100x12 UA", **more: Any) -> tl.Calculation:
    return tl.design(member(section, across=across), "100 kN", **more)


def near(value: Any, due: float) -> bool:
    return float(value.internal) == pytest.approx(due, rel=1e-9)


def sum_of_ratios(calc: tl.Calculation) -> float:
    check = calc["tension with bending"]
    assert check.capacity.internal == 1.0
    assert check.clause == "8.3.4"
    return float(check.demand.internal)


# Moments and their sum with tension -------------------------------------------------------


def test_self_weight_of_a_flat():
    """M* = 1.2·0.1386153·4000²/8 = 0.33268 kNm on 0.9·300·3600 = 0.972 kNm; 100 kN on 486 kN.

    0.20576 + 0.34226 = 0.54802.
    """
    calc = design(Across())
    assert near(calc.value("M_star_x"), M_W)
    assert M_W == pytest.approx(332_677, abs=1)
    assert near(calc.value("M_sx"), 300 * 3600)
    assert near(calc.value("M_sy"), 300 * 45_000)
    assert calc.value("M_star_y").internal == 0.0
    assert sum_of_ratios(calc) == pytest.approx(0.54802, abs=1e-5)
    assert sum_of_ratios(calc) == pytest.approx(100 / 486 + M_W / PHI_M_X, rel=1e-9)


def test_loads_offsets_and_span_of_a_flat():
    """About x (1.35·w_g + 0.1)·3000²/8 + 100e3·2; about y 0.5·3000²/8 + 100e3·10."""
    across = Across(
        span="3 m",
        weight_factor=1.35,
        load="0.1 kN/m",
        side_load="0.5 kN/m",
        offset_x="2 mm",
        offset_y="10 mm",
    )
    calc = design(across)
    M_x = (1.35 * W_G + 0.1) * 3000**2 / 8 + 100e3 * 2
    M_y = 0.5 * 3000**2 / 8 + 100e3 * 10
    assert near(calc.value("M_star_x"), M_x)
    assert near(calc.value("M_star_y"), M_y)
    assert sum_of_ratios(calc) == pytest.approx(100 / 486 + M_x / PHI_M_X + M_y / PHI_M_Y, rel=1e-9)


def test_the_moment_of_an_offset_grows_with_the_force():
    one, two = (design(Across(self_weight=False, offset_x="3 mm"), f) for f in ("60 kN", "120 kN"))
    assert near(one.value("M_star_x"), 180e3)
    assert near(two.value("M_star_x"), 360e3)
    assert sum_of_ratios(two) == pytest.approx(2 * sum_of_ratios(one), rel=1e-9)


def test_a_hanger_with_an_offset_has_no_sag():
    """Hung upright: no weight across it. 100e3·5 on 0.972e6 = 0.5144 and 100/486 = 0.2058."""
    calc = design(Across(self_weight=False, offset_x="5 mm"), service="80 kN")
    assert sum_of_ratios(calc) == pytest.approx(100 / 486 + 500e3 / PHI_M_X, rel=1e-9)
    symbols = {line.symbol.name for line in calc.sheet.lines if line.symbol}
    assert "Delta_L" in symbols
    assert not {"w_g", "Delta_s", "M_w"} & symbols


def test_nothing_across_is_no_moment():
    calc = design(Across(self_weight=False))
    assert sum_of_ratios(calc) == pytest.approx(100 / 486, rel=1e-9)
    assert PART not in {check.part for check in design(None)}


def test_the_sum_at_one_passes_and_over_one_fails():
    over = design(Across(self_weight=False, offset_x="7.8 mm"))
    assert sum_of_ratios(over) == pytest.approx(100 / 486 + 780e3 / PHI_M_X, rel=1e-9)
    assert over["tension with bending"].verdict == "fail"
    assert design(Across(self_weight=False, offset_x="7.7 mm"))["tension with bending"].passes


def test_an_angle_bends_on_its_own_modulus():
    """1.2·2866.73·7850e-9·9.81 N/mm on 4 m; Z of unsymmetrical bending, proven by its own test."""
    calc = angle(Across(side_load="0.2 kN/m"))
    weight = tl.section("150x100x12 UA").A * 7850e-9 * 9.81
    Z_x, Z_y = elastic_moduli(tl.section("150x100x12 UA"))
    assert near(calc.value("Z_ex"), Z_x)
    assert near(calc.value("Z_ey"), Z_y)
    M_x, M_y = 1.2 * weight * 4000**2 / 8, 0.2 * 4000**2 / 8
    due = 100e3 / calc.value("phiN_t").internal + M_x / (270 * Z_x) + M_y / (270 * Z_y)
    assert sum_of_ratios(calc) == pytest.approx(due, rel=1e-9)
    # 138/12·√(300/250) = 12.60 ≤ 16: nothing is taken off.
    assert calc.value("lambda_e").internal == pytest.approx(11.5 * math.sqrt(1.2), rel=1e-9)


def test_a_slender_outstand_reduces_the_modulus():
    """150x90x8: (150 - 7.8)/7.8·√(320/250) = 20.626 > 16: Z_e = Z·(16/20.626)² = 0.6018 Z."""
    calc = angle(Across(), "150x90x8 UA")
    slender = 142.2 / 7.8 * math.sqrt(320 / 250)
    assert slender == pytest.approx(20.626, abs=0.001)
    assert near(calc.value("lambda_e"), slender)
    Z_x, Z_y = elastic_moduli(tl.section("150x90x8 UA"))
    assert near(calc.value("Z_x"), Z_x)
    assert near(calc.value("Z_ex"), Z_x * (16 / slender) ** 2)
    assert near(calc.value("Z_ey"), Z_y * (16 / slender) ** 2)
    assert near(calc.value("M_sx"), 320 * Z_x * (16 / slender) ** 2)


def test_the_limit_itself_is_not_slender():
    assert bending.yields_first(16.0, 16.0)
    assert not bending.yields_first(16.0 + 1e-9, 16.0)
    assert bending.plate_slenderness(160.0, 10.0, 250.0) == 16.0


def test_a_tube_bends_alike_both_ways():
    """114.3x4.8 CHS of C350: M = f_y·π/64·(114.3⁴ - 104.7⁴)/57.15."""
    calc = tl.design(tube().but(across=Across(side_load="0.3 kN/m")), "50 kN")
    Z = math.pi / 64 * (114.3**4 - 104.7**4) / 57.15
    assert near(calc.value("M_sx"), 350 * Z)
    assert near(calc.value("M_star_y"), 0.3 * 4000**2 / 8)


def test_three_standards_give_one_sum():
    across = Across(load="0.1 kN/m", offset_y="4 mm")
    found = [
        sum_of_ratios(tl.design(flat(across), "100 kN", standard=name))
        for name in ("NZS 3404", "AS 4100", "AS 4100:1998")
    ]
    assert found[0] == found[1] == found[2]


# In service -------------------------------------------------------------------------------


def test_stretch_and_sag_by_hand():
    """60 kN in service: 60e3·4000/(200e3·1800) = 0.66667 mm.

    Sag alone 5·0.1386153·4000⁴/(384·200e3·21 600) = 106.956 mm; N_E = π²·200e3·21 600/4000²
    = 2664.8 N; under tension 106.956/(1 + 60 000/2664.8) = 4.5483 mm. The load does not count.
    """
    calc = design(Across(load="0.1 kN/m"), service="60 kN")
    assert near(calc.value("Delta_L"), 60e3 * 4000 / (200e3 * 1800))
    assert calc.value("Delta_0").internal == pytest.approx(106.956, abs=0.001)
    assert calc.value("N_E").internal == pytest.approx(2664.8, abs=0.1)
    assert calc.value("Delta_s").internal == pytest.approx(4.5483, abs=0.0002)


@pytest.mark.parametrize("service", [1, 3, 10, 60, 300])
def test_the_sag_errs_on_the_safe_side_and_by_less_than_three_percent(service):
    """Exact sag of a tie on pinned ends: w/(k²N)·(1/cosh(kL/2) - 1) + wL²/(8N), k² = N/EI.

    One term keeps π²·5/384 = 0.12851 of wL²/N where the tension rules and 1/8 is exact: 2.8 %.
    """
    N, L = service * 1e3, 4000.0
    k = math.sqrt(N / (200e3 * 21_600))
    exact = W_G / (k * k * N) * (1 / math.cosh(k * L / 2) - 1) + W_G * L**2 / (8 * N)
    found = design(Across(), service=f"{service} kN").value("Delta_s").internal
    assert exact * 0.9999 <= found <= exact * 1.029


def test_limits_are_checked_where_stated():
    calc = design(Across(sag_limit="4.5 mm", stretch_limit="0.7 mm"), service="60 kN")
    assert calc["sag"].verdict == "fail"
    assert calc["sag"].kind == "detailing"
    assert near(calc["sag"].capacity, 4.5)
    assert calc["stretch"].verdict == "pass"
    assert calc.word == "FAIL"
    loose = design(Across(sag_limit="4.6 mm", stretch_limit="0.6 mm"), service="60 kN")
    assert (loose["sag"].verdict, loose["stretch"].verdict) == ("pass", "fail")
    plain = {check.name for check in design(Across(), service="60 kN")}
    assert not {"sag", "stretch"} & plain


def test_without_a_force_in_service_nothing_is_said_of_it():
    assert "In service" not in {line.part for line in design(Across()).sheet.lines}


# Ties of a pair ---------------------------------------------------------------------------


def pair(ties: str, section: str = "2/150x100x12 UA, long legs, gap 12 mm") -> tl.Calculation:
    return tl.design(member(section, plate_end(), ties=ties), "100 kN")


def plate_end() -> tl.Bolted:
    return bolted(plate=gusset(thickness="12 mm"))


def test_ties_keep_a_component_at_300():
    """r of one 150x100x12 is 21.671 mm: 300·21.671 = 6501.4 mm."""
    check = pair("1500 mm")["spacing of the ties"]
    assert near(check.demand, 1500.0)
    assert check.capacity.internal == pytest.approx(6501.4, abs=0.1)
    assert (check.clause, check.kind, check.verdict) == ("7.4.3", "detailing", "pass")
    assert pair("6501 mm")["spacing of the ties"].passes
    assert pair("6502 mm").word == "FAIL"
