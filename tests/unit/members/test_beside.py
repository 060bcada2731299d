"""What a member carries beside its tension: loads across it, earthquake, ties; what is refused.

150x100x12, N_ty = 2866.73·300 = 860.02 kN; one line of three M20: A_n = 2866.73 - 264 = 2602.73,
φN_tu = 0.9·0.85·0.85·2602.73·440 = 744.67 kN, below φN_ty = 774.02 kN.
"""

from __future__ import annotations

import math
from typing import Any

import pytest

import tensionlib as tl
from tensionlib import Across, Overstrength
from tensionlib.errors import InputError, UnitError
from tests.builders import PLATE_STEEL, bolted, gusset, member

N_TY = (2856 + 0.25 * (4 - math.pi) * 50) * 300
END = tl.BoltedPattern(
    to="long leg",
    bolts="M20 8.8/S",
    threads="in shear plane",
    holes=tl.Pattern.lines(3, ["60 mm"], "40 mm", "70 mm"),
    plate=gusset(),
)


def brace(seismic: Overstrength | None, force: str = "100 kN", **more: Any) -> tl.Calculation:
    end = more.pop("end", END)
    return tl.design(member("150x100x12 UA", end, overstrength=seismic), force, **more)


def near(value: Any, due: float) -> bool:
    return float(value.internal) == pytest.approx(due, rel=1e-9)


def missing(calc: tl.Calculation) -> list[str]:
    return [line.title for line in calc.not_covered]


# Overstrength -----------------------------------------------------------------------------


@pytest.mark.parametrize("end", [END, bolted(gauge="60 mm")], ids=["pattern", "regular"])
@pytest.mark.parametrize(("category", "factor"), [("1", 1.35), ("2", 1.30), ("3", 1.25)])
def test_the_connection_is_designed_for_the_brace_that_yields(end, category, factor):
    """860.02 kN times 1.35, 1.30 or 1.25: 1161.03, 1118.03, 1075.02 kN. Factors from memory."""
    calc = brace(Overstrength(category, bearing_factor=2.0), end=end)
    assert near(calc.value("N_os"), factor * N_TY)
    assert near(calc.value("N_star_c"), factor * N_TY)
    # The member itself is checked for its own force.
    assert near(calc["gross section yield"].demand, 100e3)
    origin = next(line for line in calc.sheet.lines if line.title.startswith("overstrength factor"))
    assert "unsure" in origin.source


def test_a_bolt_carries_its_share_of_the_overstrength():
    """1161.03/3 = 387.01 kN."""
    shear = brace(Overstrength("1", bearing_factor=2.0))["bolt shear, most loaded bolt"]
    assert near(shear.demand, 1.35 * N_TY / 3)


def test_a_stated_factor_stands():
    assert near(brace(Overstrength("3", factor=1.1)).value("N_star_c"), 1.1 * N_TY)


def test_the_greatest_action_rules():
    """A force above the overstrength is not brought down to it."""
    calc = brace(Overstrength("3", factor=1.0), "900 kN")
    assert near(calc.value("N_star_c"), 900e3)


def test_category_4_stays_elastic():
    """0.3·φN_t = 0.3·744.67 = 223.40 kN rules."""
    calc = brace(Overstrength("4"))
    phiN_tu = 0.9 * 0.85 * 0.85 * 440 * (N_TY / 300 - 264)
    assert near(calc.value("N_star_c"), 0.3 * phiN_tu)
    assert calc.value("N_star_c").internal == pytest.approx(223.40e3, abs=10)
    assert missing(calc) == []
    notes = [line.title for line in calc.sheet.lines]
    assert any("category 4: elastic" in note for note in notes)


def test_bearing_of_a_brace_that_yields_needs_its_factor():
    assert missing(brace(Overstrength("1"))) == [
        "bearing of the ply at a bolt under earthquake",
        "bearing of the gusset at a bolt under earthquake",
    ]
    assert missing(brace(Overstrength("1", bearing_factor=1.6))) == []


def test_a_stated_bearing_factor_is_taken():
    """0.9·1.6·20·12·440 = 152.06 kN."""
    calc = brace(Overstrength("2", bearing_factor=1.6))
    bearing = calc["Member at the bolts", "ply bearing, most loaded bolt"]
    assert near(bearing.capacity, 0.9 * 1.6 * 20 * 12 * 440)
    usual = brace(None)["Member at the bolts", "ply bearing, most loaded bolt"]
    assert near(usual.capacity, 0.9 * 3.2 * 20 * 12 * 440)


@pytest.mark.parametrize("standard", ["AS 4100", "AS 4100:1998"])
def test_as_4100_has_no_overstrength(standard):
    calc = brace(Overstrength("1"), "300 kN", standard=standard)
    assert missing(calc) == ["overstrength of the brace"]
    assert "give the connection's design action as the force" in calc.not_covered[0].note
    assert near(calc.value("N_star_c"), 300e3)
    assert not calc.passes


def test_welds_carry_the_overstrength_too():
    end = tl.Welded("long leg", "6 mm", gusset(), "200 mm")
    calc = brace(Overstrength("1"), end=end)
    assert near(calc.value("N_star_c"), 1.35 * N_TY)
    assert missing(calc) == []


# Refusals ---------------------------------------------------------------------------------

REFUSED = [
    (lambda: Across(span=4000), UnitError, "span: got 4000, a bare number; .*'4 m'"),
    (lambda: Across(span="0 m"), InputError, "span: got 0 mm; it must be above 0 mm"),
    (lambda: Across(load="0.4 kN"), UnitError, "load: got '0.4 kN', a force; a weight per length"),
    (lambda: Across(load="-0.4 kN/m"), InputError, "load: got -0.4 .*; it must be at least 0"),
    (lambda: Across(side_load=0.4), UnitError, "side_load: got 0.4, a bare number; .*'0.4 kN/m'"),
    (lambda: Across(side_load="-1 kN/m"), InputError, "side_load: got -1 .* at least 0"),
    (lambda: Across(offset_x="-5 mm"), InputError, "offset_x: got -5 mm; it must be at least 0"),
    (lambda: Across(offset_y=5), UnitError, "offset_y: got 5, a bare number; .*'12 mm'"),
    (lambda: Across(sag_limit="0 mm"), InputError, "sag_limit: got 0 mm; it must be above 0 mm"),
    (lambda: Across(stretch_limit="1 kN"), UnitError, "stretch_limit: got '1 kN', a force"),
    (lambda: Across(self_weight="yes"), InputError, "self_weight: got 'yes'; True or False is due"),
    (lambda: Across(self_weight=1), InputError, "self_weight: got 1; True or False is due"),
    (lambda: Across(weight_factor=0.0), InputError, "weight_factor: got 0; it must be above 0"),
    (lambda: Across(weight_factor=2.5), InputError, "weight_factor: got 2.5; .* at most 2"),
    (lambda: Across(weight_factor=math.nan), InputError, "weight_factor: .*finite"),
    (lambda: Across(weight_factor="1.2 kN"), UnitError, "weight_factor: got '1.2 kN'"),
    (lambda: Across().but(spann="4 m"), InputError, "Across: 'spann' is not a field; .*span"),
    (lambda: Overstrength("5"), InputError, "category: got '5'; one of '1', '2', '3', '4' is due"),
    (lambda: Overstrength(1), InputError, "category: got 1; one of '1', '2', '3', '4' is due"),
    (lambda: Overstrength("1", factor=0.9), InputError, "factor: got 0.9; .* is 1.0 or more"),
    (lambda: Overstrength("1", factor=5.5), InputError, "factor: got 5.5; .* at most 5"),
    (lambda: Overstrength("1", factor="1.3 mm"), UnitError, "factor: got '1.3 mm'"),
    (lambda: Overstrength("1", bearing_factor=0), InputError, "bearing_factor: got 0; .*above 0"),
    (lambda: member(across="4 m"), InputError, r"across: got '4 m'; Across\(...\) is due"),
    (lambda: member(overstrength="1"), InputError, r"overstrength: got '1'; Overstrength\(...\)"),
    (lambda: member(ties="1 m"), InputError, "ties: given for 150x90x10 UA, which is one piece"),
    (
        lambda: member("2/150x90x10 UA, long legs, gap 12 mm", ties="0 m"),
        InputError,
        "ties: got 0 mm; it must be above 0 mm",
    ),
    (
        lambda: member("2/150x90x10 UA, long legs, gap 12 mm", ties=1500),
        UnitError,
        "ties: got 1500, a bare number; .*'1500 mm'",
    ),
]


@pytest.mark.parametrize(("make", "error", "message"), REFUSED)
def test_what_is_refused(make, error, message):
    with pytest.raises(error, match=message):
        make()


def test_a_member_that_bends_needs_an_outline():
    own = tl.stated("own", A="2000 mm2", t="10 mm", b="150 mm", source="maker")
    end = bolted(to="plate", gauge=None, plate=tl.Gusset("12 mm", PLATE_STEEL))
    tl.design(member(own, end), "10 kN")
    with pytest.raises(InputError, match="section: own has no outline, .* a catalogue section"):
        tl.design(member(own, end, across=Across()), "10 kN")
