"""Bolted ends to NZS 3404, each computed again by plain arithmetic from the clauses.

Lengths in mm, stresses in MPa, forces in N. The strengths in use: section 300 under 11 mm
f_y 320, f_u 440; plate 250 over 8 to 12 mm f_y 260, f_u 410; bolt 8.8 f_uf 830.
"""

from __future__ import annotations

from math import pi, sqrt, tan

import pytest

import tensionlib as tl
from tests.builders import bolted, gusset, member, two_lines

SPREAD = 2 * tan(pi / 6)
FILLET = 1 - pi / 4


def capacities(calc: tl.Calculation) -> dict[tuple[str, str], float]:
    """Every strength check's capacity in N, by part and name."""
    return {(c.part, c.name): c.capacity.internal for c in calc.checks if c.kind == "strength"}


def agree(calc: tl.Calculation, by_hand: dict[tuple[str, str], float]) -> None:
    """The same checks, no more and no fewer, at the same capacities."""
    found = capacities(calc)
    assert set(found) == set(by_hand)
    for name, capacity in by_hand.items():
        assert found[name] == pytest.approx(capacity, rel=1e-9), name


def block(f_u: float, f_y: float, A_gv: float, A_nv: float, A_nt: float) -> float:
    """0.75 of the lesser of shear fracture and shear yield, and fracture in tension."""
    return 0.75 * (min(0.6 * f_u * A_nv, 0.6 * f_y * A_gv) + f_u * A_nt)


def test_equal_angle_one_line():
    """100x100x8 EA, three M20 at 70, holes 22, gauge 55, ends 40, gusset 10."""
    end = bolted(to="leg", gauge="55 mm", plate=gusset(thickness="10 mm"))
    calc = tl.design(member("100x100x8 EA", end), "150 kN")
    A_g = 7.8 * (100 + 100 - 7.8) + FILLET * (8**2 - 2 * 5**2)
    A_n = A_g - 22 * 7.8
    b_d = SPREAD * 140
    agree(
        calc,
        {
            ("Member", "gross section yield"): 0.9 * A_g * 320,
            ("Net section", "net section rupture"): 0.9 * 0.85 * 0.85 * A_n * 440,
            ("Bolts", "bolt shear"): 0.8 * 3 * 0.62 * 830 * 225,
            # Ahead of the end bolt 40 − 11 + 10 = 39; between bolts 70 − 22 + 10 = 58.
            ("Member at the bolts", "ply bearing and tear-out"): 0.9 * 3 * 39 * 7.8 * 440,
            ("Member at the bolts", "block shear, line to edge"): block(
                440, 320, 180 * 7.8, (180 - 2.5 * 22) * 7.8, (45 - 11) * 7.8
            ),
            ("Gusset", "ply bearing and tear-out"): 0.9 * 3 * 39 * 10 * 410,
            ("Gusset", "yield"): 0.9 * b_d * 10 * 260,
            ("Gusset", "rupture"): 0.9 * 0.85 * (b_d - 22) * 10 * 410,
        },
    )
    assert calc["bolt shear"].demand.internal == 150e3
    assert calc.passes


def test_unequal_angle_by_its_short_leg():
    """150x90x10 UA (9.5 thick) by the 90 leg: k_te 0.75, four M20 with the shank in shear."""
    end = bolted(to="short leg", gauge="45 mm", per_line=4, threads="out of shear plane")
    calc = tl.design(member("150x90x10 UA", end), "250 kN")
    A_g = 9.5 * (150 + 90 - 9.5) + FILLET * (10**2 - 2 * 5**2)
    b_d = SPREAD * 210
    agree(
        calc,
        {
            ("Member", "gross section yield"): 0.9 * A_g * 320,
            ("Net section", "net section rupture"): 0.9 * (0.85 * 0.75 * (A_g - 22 * 9.5) * 440),
            ("Bolts", "bolt shear"): 0.8 * 4 * 0.62 * 830 * 314,
            ("Member at the bolts", "ply bearing and tear-out"): 0.9 * 4 * 39 * 9.5 * 440,
            ("Member at the bolts", "block shear, line to edge"): block(
                440, 320, 250 * 9.5, (250 - 3.5 * 22) * 9.5, (45 - 11) * 9.5
            ),
            ("Gusset", "ply bearing and tear-out"): 0.9 * 4 * 39 * 12 * 410,
            ("Gusset", "yield"): 0.9 * b_d * 12 * 260,
            ("Gusset", "rupture"): 0.9 * 0.85 * (b_d - 22) * 12 * 410,
        },
    )


@pytest.mark.parametrize(
    ("stagger", "step"),
    [("35 mm", 35.0), ("50 mm", 20.0), ("20 mm", 20.0)],
    ids=["half the pitch", "nearer the next bolt", "nearer the same bolt"],
)
def test_staggered_lines_in_one_leg(stagger, step):
    """150x100x12 UA by the long leg, lines 60 apart, the second one standing back."""
    end = bolted(gauge="55 mm", lines=2, line_spacing="60 mm", stagger=stagger)
    calc = tl.design(member("150x100x12 UA", end), "300 kN")
    A_g = 12 * (150 + 100 - 12) + FILLET * (10**2 - 2 * 5**2)
    lost = max(22 * 12, 2 * 22 * 12 - step**2 * 12 / (4 * 60))
    # 12 mm is in the band from 11 to 17 mm: f_y 300.
    found = capacities(calc)
    assert found["Member", "gross section yield"] == pytest.approx(0.9 * A_g * 300)
    assert found["Net section", "net section rupture"] == pytest.approx(
        0.9 * 0.85 * 0.85 * (A_g - lost) * 440
    )
    assert found["Bolts", "bolt shear"] == pytest.approx(0.8 * 6 * 0.62 * 830 * 225)
    L_j = 140 + float(stagger.split()[0])
    assert calc.value("L_j").internal == pytest.approx(L_j)
    # The line in front spreads over its own 140 mm, the one that stands back over all of L_j.
    b_d = 60 + SPREAD / 2 * (140 + L_j)
    assert found["Gusset", "yield"] == pytest.approx(0.9 * b_d * 12 * 260)
    apart = calc["least distance between lines"]
    assert apart.capacity.internal == pytest.approx(sqrt(step**2 + 60**2))


def test_a_wide_stagger_leaves_the_straight_line_to_rule():
    """The step 100²·12/(4·60) = 500 mm² exceeds the second hole's 264 mm²."""
    end = bolted(
        gauge="55 mm", lines=2, line_spacing="60 mm", pitch="200 mm", stagger="100 mm", per_line=2
    )
    calc = tl.design(member("150x100x12 UA", end), "300 kN")
    assert 2 * 264 - 500 < 264
    assert calc.value("A_d").internal == pytest.approx(264.0)


def test_channel_by_its_web():
    """150 PFC (web 6, flange 9.5) by the web, one line in the middle; the flange sets f_y."""
    end = bolted(to="web", gauge=None, plate=gusset(thickness="10 mm"))
    calc = tl.design(member("150 PFC", end), "150 kN")
    A_g = 2 * 75 * 9.5 + (150 - 2 * 9.5) * 6 + FILLET * 2 * 10**2
    b_d = SPREAD * 140
    agree(
        calc,
        {
            ("Member", "gross section yield"): 0.9 * A_g * 320,
            ("Net section", "net section rupture"): 0.9 * 0.85 * 0.85 * (A_g - 22 * 6) * 440,
            ("Bolts", "bolt shear"): 0.8 * 3 * 0.62 * 830 * 225,
            ("Member at the bolts", "ply bearing and tear-out"): 0.9 * 3 * 39 * 6 * 440,
            ("Gusset", "ply bearing and tear-out"): 0.9 * 3 * 39 * 10 * 410,
            ("Gusset", "yield"): 0.9 * b_d * 10 * 260,
            ("Gusset", "rupture"): 0.9 * 0.85 * (b_d - 22) * 10 * 410,
        },
    )


def test_two_channels_back_to_back():
    """Two shear planes a bolt, two webs in bearing, k_te 1.0, lines 60 apart in the web."""
    end = two_lines(to="web", line_spacing="60 mm")
    calc = tl.design(member("2/180 PFC, webs, gap 12 mm", end), "500 kN")
    A_g = 2 * (2 * 75 * 11 + (180 - 2 * 11) * 6 + FILLET * 2 * 12**2)
    A_n = A_g - 2 * 2 * 22 * 6
    # The flange of 11 mm sets f_y: from 11 to 17 mm 300.
    b_d = 60 + SPREAD * 140
    agree(
        calc,
        {
            ("Member", "gross section yield"): 0.9 * A_g * 300,
            ("Net section", "net section rupture"): 0.9 * 0.85 * 1.0 * A_n * 440,
            ("Bolts", "bolt shear"): 0.8 * 6 * 0.62 * 830 * 2 * 225,
            ("Member at the bolts", "ply bearing and tear-out"): 0.9 * 2 * 6 * 39 * 6 * 440,
            ("Member at the bolts", "block shear, between the lines"): block(
                440, 300, 2 * 2 * 180 * 6, 2 * 2 * (180 - 2.5 * 22) * 6, 2 * (60 - 22) * 6
            ),
            ("Gusset", "ply bearing and tear-out"): 0.9 * 6 * 39 * 12 * 410,
            ("Gusset", "yield"): 0.9 * b_d * 12 * 260,
            ("Gusset", "rupture"): 0.9 * 0.85 * (b_d - 2 * 22) * 12 * 410,
            ("Gusset", "block shear, between the lines"): block(
                410, 260, 2 * 180 * 12, 2 * (180 - 2.5 * 22) * 12, (60 - 22) * 12
            ),
        },
    )


def test_column_by_both_flanges_long_enough():
    """150 UC 30.0 (flanges 153 by 9.4, deep 158): joint of 210, two gussets."""
    end = two_lines(to="both flanges", line_spacing="90 mm", per_line=4)
    calc = tl.design(member("150 UC 30.0", end), "500 kN")
    A_g = 2 * 153 * 9.4 + (158 - 2 * 9.4) * 6.6 + FILLET * 4 * 8.9**2
    b_d = 90 + SPREAD * 210
    e_2 = (153 - 90) / 2
    agree(
        calc,
        {
            ("Member", "gross section yield"): 0.9 * A_g * 320,
            ("Net section", "net section rupture"): 0.9
            * (0.85 * 0.85 * (A_g - 4 * 22 * 9.4) * 440),
            ("Bolts", "bolt shear"): 0.8 * 16 * 0.62 * 830 * 225,
            ("Member at the bolts", "ply bearing and tear-out"): 0.9 * 16 * 39 * 9.4 * 440,
            ("Member at the bolts", "block shear, each line to its edge"): block(
                440, 320, 4 * 250 * 9.4, 4 * (250 - 3.5 * 22) * 9.4, 4 * (e_2 - 11) * 9.4
            ),
            ("Gusset", "ply bearing and tear-out"): 0.9 * 16 * 39 * 12 * 410,
            ("Gusset", "yield"): 0.9 * 2 * b_d * 12 * 260,
            ("Gusset", "rupture"): 0.9 * 0.85 * 2 * (b_d - 2 * 22) * 12 * 410,
            ("Gusset", "block shear, between the lines"): block(
                410, 260, 2 * 2 * 250 * 12, 2 * 2 * (250 - 3.5 * 22) * 12, 2 * (90 - 22) * 12
            ),
        },
    )


@pytest.mark.parametrize(
    ("pitch", "covered"), [("53 mm", True), ("52.6 mm", False)], ids=["159 mm", "157.8 mm"]
)
def test_column_by_both_flanges_covers_its_depth_or_not(pitch, covered):
    """158 deep: a joint of three pitches just longer is covered, one just shorter is not."""
    end = two_lines(to="both flanges", line_spacing="90 mm", per_line=4, pitch=pitch)
    calc = tl.design(member("150 UC 30.0", end), "500 kN")
    assert (calc.word == "PASS") == covered
    if not covered:
        (line,) = calc.not_covered
        assert calc.word == "NOT COVERED"
        assert (line.part, line.title, line.clause) == (
            "Net section",
            "net section rupture",
            "7.3.2",
        )
        # Without the net section the member's capacity is that of its gross section.
        assert calc.value("phiN_t").internal == pytest.approx(
            0.9 * calc.value("A_g").internal * 320
        )


def test_tee_by_its_flange():
    """155 BT 20.2, half of 310 UB 40.4: flange 165 by 10.2, stem 6.1, k_te 0.90."""
    end = two_lines(to="flange", line_spacing="90 mm")
    calc = tl.design(member("155 BT 20.2", end), "300 kN")
    A_g = 165 * 10.2 + (152 - 10.2) * 6.1 + FILLET * 2 * 11.4**2
    e_2 = (165 - 90) / 2
    found = capacities(calc)
    assert found["Member", "gross section yield"] == pytest.approx(0.9 * A_g * 320)
    assert found["Net section", "net section rupture"] == pytest.approx(
        0.9 * 0.85 * 0.90 * (A_g - 2 * 22 * 10.2) * 440
    )
    assert found["Member at the bolts", "block shear, each line to its edge"] == pytest.approx(
        block(440, 320, 2 * 180 * 10.2, 2 * (180 - 55) * 10.2, 2 * (e_2 - 11) * 10.2)
    )


def test_flat():
    """150x12 FL, two lines 70 apart, whole section connected: k_te 1.0, 12 mm f_y 300."""
    calc = tl.design(member("150x12 FL", two_lines(to="plate")), "300 kN")
    A_g = 150 * 12
    found = capacities(calc)
    assert found["Member", "gross section yield"] == pytest.approx(0.9 * A_g * 300)
    assert found["Net section", "net section rupture"] == pytest.approx(
        0.9 * 0.85 * 1.0 * (A_g - 2 * 22 * 12) * 440
    )
    assert found["Member at the bolts", "block shear, each line to its edge"] == pytest.approx(
        block(440, 300, 2 * 180 * 12, 2 * 125 * 12, 2 * (40 - 11) * 12)
    )
    assert found["Member at the bolts", "block shear, between the lines"] == pytest.approx(
        block(440, 300, 2 * 180 * 12, 2 * 125 * 12, (70 - 22) * 12)
    )


def test_long_joint():
    """Seven M20 at 75: L_j = 450, k_r = 1.075 − 450/4000 = 0.9625."""
    calc = tl.design(member(end=bolted(per_line=7, pitch="75 mm")), "300 kN")
    assert calc.value("L_j").internal == 450.0
    assert calc["bolt shear"].capacity.internal == pytest.approx(
        0.8 * 7 * 0.62 * 830 * 0.9625 * 225
    )
