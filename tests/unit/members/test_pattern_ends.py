"""Ends with any pattern of holes, every figure worked by hand beside the test.

150x100x12 of AS/NZS 3679.1 300 unless said otherwise: 12 mm thick, so f_y 300 and f_u 440 MPa;
A_g = (150 + 100 - 12)12 + 0.2146·10² - 2·0.2146·5² = 2866.73 mm². M20 in holes of 22 mm.
"""

from __future__ import annotations

import math
from typing import Any

import pytest

import tensionlib as tl
from tensionlib import Hole, Pattern
from tensionlib.calculation.readback import check_line
from tensionlib.members.pattern import PatternGeometry
from tensionlib.quantities import NAMED_ROLES
from tensionlib.standards import standard
from tests.builders import PLATE_STEEL, gusset, member

A_G = 2856 + 0.25 * (4 - math.pi) * (10**2 - 2 * 5**2)
LINE = Pattern.lines(3, ["60 mm"], "40 mm", "70 mm")  # holes at 40, 110 and 180 mm
ONE_LEG = 0.9 * 0.85 * 0.85 * 440  # φ·0.85·k_te·f_u
BOTH_LEGS = 0.9 * 0.85 * 1.0 * 440


def pattern(holes: Pattern = LINE, **changes: Any) -> tl.BoltedPattern:
    usual = {
        "to": "long leg",
        "bolts": "M20 8.8/S",
        "threads": "in shear plane",
        "holes": holes,
        "plate": gusset(),
    }
    return tl.BoltedPattern(**usual | changes)


def design(
    holes: Pattern = LINE,
    section: str = "150x100x12 UA",
    *,
    service: str | None = None,
    force: str = "300 kN",
    **changes: Any,
) -> tl.Calculation:
    tie = member(section, pattern(holes, **changes))
    return tl.design(tie, force, service=service)


def near(value: Any, due: float) -> bool:
    return float(value.internal) == pytest.approx(due, rel=1e-9)


def chain(calc: tl.Calculation) -> str:
    (note,) = [x.title for x in calc.sheet.lines if x.title.startswith("Every chain")]
    return note.rpartition("is ")[2].rstrip(".")


# Net section ------------------------------------------------------------------------------


def test_both_legs_staggered():
    """g = 55 + 55 - 12 = 98: A_d = 2·22·12 - 35²·12/(4·98) = 528 - 37.5 = 490.5."""
    holes = Pattern.lines(2, ["55 mm"], "40 mm", "70 mm") + Pattern.lines(
        2, ["55 mm"], "75 mm", "70 mm", element="short leg", first=3
    )
    calc = design(holes)
    assert near(calc.value("A_d"), 490.5)
    assert near(calc.value("A_n"), A_G - 490.5)
    assert near(calc["net section rupture"].capacity, BOTH_LEGS * (A_G - 490.5))
    assert calc.value("phiN_tu").internal == pytest.approx(799.84e3, abs=5.0)
    assert calc.value("L_j").internal == 105.0
    assert chain(calc) == "holes 2 – 4"


def three_lines(pitch: int) -> Pattern:
    """Lines at 55 and 115 mm in the long leg and 55 mm in the short leg; the first stands half a
    pitch before the others."""
    half = f"{pitch // 2} mm"
    return Pattern.lines(
        2, ["55 mm", "115 mm"], "40 mm", f"{pitch} mm", ["0 mm", half]
    ) + Pattern.lines(
        2, ["55 mm"], f"{40 + pitch // 2} mm", f"{pitch} mm", (), element="short leg", first=5
    )


def test_the_zigzag_through_three_holes_governs_a_small_stagger():
    """3·264 - 35²·12/(4·60) - 35²·12/(4·98) = 792 - 61.25 - 37.5 = 693.25, straight only 528."""
    calc = design(three_lines(70))
    assert near(calc.value("A_d"), 693.25)
    assert chain(calc).count("–") == 2
    assert near(calc.value("phiN_tu"), BOTH_LEGS * (A_G - 693.25))


def test_the_straight_chain_governs_a_great_stagger():
    """Zigzag 792 - 70²·12/(4·60) - 70²·12/(4·98) = 792 - 245 - 150 = 397; straight 2·264 = 528."""
    calc = design(three_lines(140))
    assert near(calc.value("A_d"), 528.0)
    assert chain(calc) == "holes 4 – 6"


def test_credit_for_the_bolts_behind():
    """150x12 flat, a row of two long slots of 50 mm across it and one standard hole behind.

    Chain of slots: A_n = 1800 - 2·50·12 = 600, carries (3 - 1)/3 of the force. Hole behind:
    1800 - 264 = 1536, carries all. (2/3)/600 > 1/1536, so the slots govern.
    """
    slots = tuple(
        Hole(mark, "40 mm", y, kind="long slot", slot="across")
        for mark, y in (("1", "40 mm"), ("2", "110 mm"))
    )
    holes = Pattern((*slots, Hole("3", "180 mm", "75 mm")))
    calc = design(holes, "150x12 FL", to="plate", credit_behind=True)
    assert near(calc.value("A_n"), 600.0)
    assert calc.value("n_k").internal == 1.0
    check = calc["net section rupture"]
    assert near(check.demand, 200e3)
    assert near(check.capacity, 0.9 * 0.85 * 440 * 600)
    plain = design(holes, "150x12 FL", to="plate")["net section rupture"]
    assert near(plain.demand, 300e3)


def test_credit_does_not_reach_the_hole_nearest_the_body():
    """One line: the last hole has no bolt behind it and carries all."""
    calc = design(credit_behind=True)
    assert calc.value("n_k").internal == 0.0
    assert near(calc["Net section", "net section rupture"].demand, 300e3)


def test_flanges_and_web_of_a_channel():
    """200 PFC: d 200, b_f 75, t_f 12, t_w 6; A = 2·75·12 + 176·6 + 2·0.2146·12² = 2917.81.

    Web hole at 100, flange holes at 45 from the back, 35 mm farther in. Round a corner
    g = 45 + 100 - 6/2 - 12/2 = 136; the web is the thinner plate, so each step gains
    35²·6/(4·136) = 13.5110. A_d = 2·22·12 + 22·6 - 2·13.5110 = 632.978.
    """
    holes = Pattern(
        (
            Hole("w1", "40 mm", "100 mm"),
            Hole("w2", "110 mm", "100 mm"),
            Hole("a", "145 mm", "45 mm", "flange 1"),
            Hole("b", "145 mm", "45 mm", "flange 2"),
        )
    )
    calc = design(holes, "200 PFC", to="web")
    A_g = 1800 + 1056 + 0.5 * (4 - math.pi) * 12**2
    A_d = 528 + 132 - 2 * 35**2 * 6 / (4 * 136)
    assert chain(calc) == "holes a – w2 – b"
    assert near(calc.value("A_d"), A_d)
    assert near(calc.value("phiN_tu"), BOTH_LEGS * (A_g - A_d))
    # A quarter of the force by each bolt: tear-out of a flange of 12 and of the web of 6.
    flange = calc["Member at the bolts, flange 1", "ply tear-out, worst bolt"]
    assert near(flange.capacity, 0.9 * (145 - 11 + 10) * 12 * 440)
    web = calc["Member at the bolts, web", "ply tear-out, worst bolt"]
    assert near(web.capacity, 0.9 * (40 - 11 + 10) * 6 * 440)
    assert near(web.demand, 75e3)


def test_flanges_and_web_of_an_i():
    """310UB40.4: d 304, b_f 165, t_f 10.2, t_w 6.1. Four flange holes and one of the web abreast:
    A_d = 4·22·10.2 + 22·6.1 = 897.6 + 134.2 = 1031.8; every element is held, so k_te = 1."""
    holes = Pattern.lines(2, ["152 mm"], "40 mm", "70 mm", element="web")
    for i, flange in enumerate(("flange 1", "flange 2")):
        holes += Pattern.lines(
            2, ["37.5 mm", "127.5 mm"], "40 mm", "70 mm", (), element=flange, first=10 + 4 * i
        )
    calc = design(holes, "310UB40.4", to="both flanges")
    A_g = tl.section("310UB40.4").A
    assert near(calc.value("A_d"), 1031.8)
    assert near(calc.value("phiN_tu"), BOTH_LEGS * (A_g - 1031.8))
    assert calc.value("n_b").internal == 10.0
    # A line to its own edge takes 2 of the 10 bolts: L 110, h 33, b 37.5, h 11; f_y of 10.2 is 320.
    block = calc["Member at the bolts, flange 1", "block shear"]
    plane = min(0.6 * 440 * (110 - 33), 0.6 * 320 * 110)
    assert near(block.capacity, 0.75 * 10.2 * (plane + 440 * (37.5 - 11)))
    assert near(block.demand, calc.value("N_star_c").internal * 2 / 10)


def test_a_double_angle_has_two_of_everything():
    """A_d = 2·22·12 = 528; V_f = 0.62·830·2·225 = 231.57 kN; plies 0.9·2·(40 - 11 + 10)·12·440."""
    calc = design(LINE, "2/150x100x12 UA, long legs, gap 12 mm", force="600 kN")
    assert near(calc.value("A_d"), 528.0)
    assert near(calc.value("A_n"), 2 * A_G - 528)
    shear = calc["bolt shear, most loaded bolt"]
    assert near(shear.capacity, 0.8 * 0.62 * 830 * 2 * 225)
    assert near(shear.demand, 600e3 / 3)
    tear = calc["Member at the bolts", "ply tear-out, worst bolt"]
    assert near(tear.capacity, 0.9 * 2 * 39 * 12 * 440)
    assert near(calc["Gusset", "ply tear-out, worst bolt"].capacity, 0.9 * 39 * 12 * 410)


@pytest.mark.parametrize(("number", "planes"), [(1, 1), (2, 2)])
def test_covers_of_a_splice(number, planes):
    """150x12 flat, two lines of two, covers 10 x 150: b_d = 70 + 2·70·tan 30° = 150.83 > 150.

    Yield 0.9·n·150·10·260; rupture 0.9·0.85·n·(1500 - 2·22·10)·410.
    """
    holes = Pattern.lines(2, ["40 mm", "110 mm"], "40 mm", "70 mm")
    covers = tl.Covers("10 mm", PLATE_STEEL, "150 mm", number=number)
    calc = design(holes, "150x12 FL", to="plate", plate=covers)
    assert near(calc["bolt shear, most loaded bolt"].capacity, 0.8 * 0.62 * 830 * planes * 225)
    assert near(calc["Cover plates", "yield"].capacity, 0.9 * number * 1500 * 260)
    assert near(calc["Cover plates", "rupture"].capacity, 0.765 * number * 1060 * 410)
    # The side of a cover is (150 - 70)/2 = 40 mm from its outer bolts.
    assert near(calc["least edge distance, cover plate side"].capacity, 40.0)
    # Both lines to one edge, sheared along the farther: L 110, h 33, b 70 + 40, h 33, which is
    # less than both lines sheared, 2·77 and 70 - 22 in tension.
    block = number * 10 * (min(246 * 77, 156 * 110) + 410 * 77)
    assert near(calc["Cover plates", "block shear"].capacity, 0.75 * block)


# Elastic shares ---------------------------------------------------------------------------


def test_the_moment_of_a_line_off_the_centroid():
    """The angle's centroid lies 49.11 mm from the heel along the long leg, the bolts at 60 mm.

    Rectangles 150·12 at 75 and 88·12 at 6, root fillet 21.46 mm² at 14.234, toes 5.365 mm² each
    at 148.883 and 10.883: y = (135 000 + 6 336 + 305.5 - 798.8 - 58.4)/2866.73 = 49.110.
    e = 10.890, I_b = 2·70² = 9800. End bolts: V_x = 300/3 = 100, V_y = 300·10.890·70/9800 = 23.336
    and V = √(100² + 23.336²) = 102.687 kN.
    """
    calc = design(share="elastic")
    assert calc.value("e_b").internal == pytest.approx(10.890, abs=0.001)
    assert near(calc.value("I_b"), 9800.0)
    assert near(calc.value("V_x", "Bolts"), 100e3)
    assert abs(calc.value("V_y", "Bolts").internal) == pytest.approx(23.336e3, abs=3.0)
    assert calc["bolt shear, most loaded bolt"].demand.internal == pytest.approx(102.687e3, abs=2.0)
    # Bolt 1 presses to the end askew: cos a = 100/102.687, so 29 mm become 29/0.97383 = 29.779.
    tear = calc["Member at the bolts", "ply tear-out, worst bolt"]
    assert tear.capacity.internal == pytest.approx(0.9 * 39.779 * 12 * 440, abs=20.0)


@pytest.mark.parametrize("holes", [LINE, three_lines(70).without_hole("5").without_hole("6")])
def test_elastic_shares_are_in_equilibrium(holes):
    tie = member("150x100x12 UA", pattern(holes, share="elastic"))
    group = PatternGeometry(tie.profile, tie.material, tie.end, standard("NZS 3404")).group
    assert math.fsum(s.along for s in group.shares) == pytest.approx(1.0, abs=1e-12)
    assert math.fsum(s.across for s in group.shares) == pytest.approx(0.0, abs=1e-12)
    # Their moment about the line of the member's force is nothing.
    line = group.y_c - group.e
    assert line == pytest.approx(49.110, abs=0.001)
    moment = math.fsum(s.x * s.across - (s.y + group.y_c - line) * s.along for s in group.shares)
    assert moment == pytest.approx(0.0, abs=1e-9)


# Blocks -----------------------------------------------------------------------------------


def test_the_block_to_the_toe():
    """L 180, h 2.5·22 = 55, b 90, h 11: min(264·125; 180·180) = min(33 000; 32 400) N/mm."""
    whole = 12 * (32_400 + 440 * 79)
    assert near(design()["Member at the bolts", "block shear"].capacity, 0.75 * whole)


def test_tension_on_the_block_not_uniform():
    """k_bs = 0.5 halves the tension part alone."""
    half = 12 * (32_400 + 0.5 * 440 * 79)
    calc = design(block_tension="non-uniform")
    assert near(calc["Member at the bolts", "block shear"].capacity, 0.75 * half)


# Readings ---------------------------------------------------------------------------------

UNITS = {unit.latex: unit.size for unit in map(tl.METRIC.unit, NAMED_ROLES)}
ENDS = {
    "staggered in both legs": lambda: design(three_lines(70)),
    "credit": lambda: design(credit_behind=True, block_tension="non-uniform"),
    "elastic": lambda: design(share="elastic", packing="8 mm"),
    "channel": lambda: design(
        Pattern.lines(2, ["100 mm"], "40 mm", "70 mm")
        + Pattern.lines(1, ["45 mm"], "75 mm", element="flange 2", first=3),
        "200 PFC",
        to="web",
    ),
    "friction": lambda: design(bolts="M20 8.8/TF", service="150 kN"),
    "covers": lambda: design(
        Pattern.lines(2, ["40 mm", "110 mm"], "40 mm", "70 mm"),
        "150x12 FL",
        to="plate",
        plate=tl.Covers("10 mm", PLATE_STEEL, "150 mm"),
    ),
}


@pytest.mark.parametrize("name", ENDS)
def test_every_reading_is_there_and_every_line_reads_back(name):
    calc = ENDS[name]()
    assert calc.heading.mark in calc.html()
    assert r"\begin{aligned}" in calc.latex()
    assert calc.headline.partition(": ")[0] in calc.text()
    read = 0
    for part in calc.record()["parts"]:
        for line in part["lines"]:
            if line["kind"] in ("formula", "extreme") and len(line["steps"]) == 3:
                check_line(line["steps"][1], line["steps"][2], UNITS)
                read += 1
    assert read > 20


def test_one_bolt_in_the_web_does_not_hold_it():
    """One of nine bolts in a web with 36 % of the area: the section is not held evenly."""
    holes = Pattern.lines(1, ["152 mm"], "40 mm", element="web")
    for i, flange in enumerate(("flange 1", "flange 2")):
        holes += Pattern.lines(
            2, ["37.5 mm", "127.5 mm"], "40 mm", "70 mm", (), element=flange, first=10 + 4 * i
        )
    calc = design(holes, "310UB40.4", to="both flanges")
    assert "net section rupture" in [line.title for line in calc.not_covered]
