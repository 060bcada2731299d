"""Welded ends to NZS 3404, each computed again by plain arithmetic from the clauses.

Lengths in mm, stresses in MPa, forces in N. Fillets of E48XX, 480 MPa, quality SP: 0.8 · 0.6 · 480
· leg/√2 a millimetre of run.
"""

from __future__ import annotations

from math import pi, sqrt, tan

import pytest

import tensionlib as tl
from tests.builders import gusset, member, tube, welded

SPREAD = 2 * tan(pi / 6)
FILLET = 1 - pi / 4


def agree(calc: tl.Calculation, by_hand: dict[tuple[str, str], float]) -> None:
    found = {(c.part, c.name): c.capacity.internal for c in calc.checks if c.kind == "strength"}
    assert set(found) == set(by_hand)
    for name, capacity in by_hand.items():
        assert found[name] == pytest.approx(capacity, rel=1e-9), name


def run(leg: float, length: float, *, phi: float = 0.8, f_uw: float = 480.0) -> float:
    return phi * 0.6 * f_uw * leg / sqrt(2) * length


def test_angle_with_a_transverse_run():
    """150x90x10 UA by the long leg: runs of 180 and 120, and 150 across the end."""
    end = welded(length_1="180 mm", length_2="120 mm", transverse="150 mm")
    calc = tl.design(member("150x90x10 UA", end), "300 kN")
    A_g = 9.5 * (150 + 90 - 9.5) + FILLET * (10**2 - 2 * 5**2)
    b_d = 150 + SPREAD * 120
    agree(
        calc,
        {
            ("Member", "gross section yield"): 0.9 * A_g * 320,
            ("Net section", "net section rupture"): 0.9 * 0.85 * 0.85 * A_g * 440,
            ("Welds", "weld"): run(6, 180 + 120 + 150),
            ("Gusset", "yield"): 0.9 * b_d * 12 * 260,
            ("Gusset", "rupture"): 0.9 * 0.85 * b_d * 12 * 410,
        },
    )
    assert "weld length over the width between runs" not in {c.name for c in calc.checks}


def test_side_runs_alone_are_advised_to_be_as_long_as_the_leg():
    calc = tl.design(member(end=welded(length_1="180 mm", length_2="120 mm")), "100 kN")
    advice = calc["weld length over the width between runs"]
    assert (advice.demand.internal, advice.capacity.internal) == (150.0, 120.0)
    assert (advice.kind, advice.verdict) == ("advice", "advice")
    assert calc.word == "PASS"


def test_two_angles_welded():
    """Both sides of the gusset: twice the runs, k_te 1.0."""
    calc = tl.design(member("2/150x90x10 UA, long legs, gap 12 mm", welded()), "500 kN")
    A_g = 2 * (9.5 * (150 + 90 - 9.5) + FILLET * (10**2 - 2 * 5**2))
    assert calc["weld"].capacity.internal == pytest.approx(run(6, 2 * 2 * 150))
    assert calc["net section rupture"].capacity.internal == pytest.approx(0.9 * 0.85 * A_g * 440)


@pytest.mark.parametrize(
    ("quality", "metal", "phi", "f_uw"),
    [("SP", "E41XX", 0.8, 410.0), ("GP", "E48XX", 0.6, 480.0), ("GP", "B-E49XX", 0.6, 490.0)],
)
def test_quality_and_metal(quality, metal, phi, f_uw):
    calc = tl.design(member(end=welded(quality=quality, metal=metal)), "100 kN")
    assert calc["weld"].capacity.internal == pytest.approx(run(6, 300, phi=phi, f_uw=f_uw))


def test_round_bar_in_a_slot_of_the_gusset():
    """30 RB, four runs of 100: the force is spread over the whole bar, k_te 1.0."""
    calc = tl.design(member("30 RB", welded(to="bar", length_1="100 mm")), "100 kN")
    A_g = pi / 4 * 30**2
    b_d = 30 + SPREAD * 100
    agree(
        calc,
        {
            # Rounds have bands of their own: to 50 mm f_y 300.
            ("Member", "gross section yield"): 0.9 * A_g * 300,
            ("Net section", "net section rupture"): 0.9 * 0.85 * 1.0 * A_g * 440,
            ("Welds", "weld"): run(6, 4 * 100),
            ("Gusset", "yield"): 0.9 * b_d * 12 * 260,
            # The bar's slot is taken off the gusset.
            ("Gusset", "rupture"): 0.9 * 0.85 * (b_d - 30) * 12 * 410,
        },
    )


def test_slotted_tube_with_a_stated_factor():
    """114.3x4.8 CHS over a gusset of 12 with 2 of clearance: two slots of 14 through 4.8."""
    calc = tl.design(tube(k_te=0.8, k_te_reason="test of a like joint, report 7"), "200 kN")
    A_g = pi / 4 * (114.3**2 - (114.3 - 9.6) ** 2)
    A_n = A_g - 2 * 4.8 * 14
    b_d = 114.3 + SPREAD * 150
    agree(
        calc,
        {
            ("Member", "gross section yield"): 0.9 * A_g * 350,
            ("Net section", "net section rupture"): 0.9 * 0.85 * 0.8 * A_n * 430,
            ("Welds", "weld"): run(6, 4 * 150),
            ("Gusset", "yield"): 0.9 * b_d * 12 * 260,
            ("Gusset", "rupture"): 0.9 * 0.85 * b_d * 12 * 410,
        },
    )
    assert calc.word == "PASS"
    assert "stated by the engineer: test of a like joint, report 7" in calc.text()


def test_slotted_tube_without_a_factor_is_not_covered():
    calc = tl.design(tube(), "200 kN")
    assert calc.word == "NOT COVERED"
    assert not calc.passes
    (line,) = calc.not_covered
    assert (line.title, line.clause) == ("net section rupture", "7.3.2")
    assert "Table 7.3.2 has no row for this section (CHS)" in line.note


@pytest.mark.parametrize(
    ("l_1", "k_r"),
    [(1700, 1.0), (1701, 1.10 - 0.06 * 1.701), (8000, 1.10 - 0.06 * 8.0), (8001, 0.62)],
)
def test_long_laps(l_1, k_r):
    """Table 9.7.3.10(2): none to 1.7 m, 1.10 − 0.06 l to 8 m, 0.62 beyond."""
    calc = tl.design(member(end=welded(length_1=f"{l_1} mm")), "100 kN")
    assert calc.value("k_r").internal == pytest.approx(k_r, rel=1e-12)
    assert calc["weld"].capacity.internal == pytest.approx(run(6, 2 * l_1) * k_r)


@pytest.mark.parametrize(
    ("plate", "least"),
    [("6 mm", 4.0), ("10 mm", 4.0), ("10.1 mm", 5.0), ("15 mm", 5.0), ("15.1 mm", 6.0)],
)
def test_least_leg_by_the_thicker_part(plate, least):
    """Table 9.7.3.2; the angle's 9.5 mm is the thicker part beside a gusset of 6."""
    end = welded(plate=gusset(thickness=plate))
    check = tl.design(member(end=end), "100 kN")["least weld size"]
    assert check.demand.internal == least
    assert check.clause == "Table 9.7.3.2"


@pytest.mark.parametrize(("plate", "least"), [("7 mm", 3.0), ("7.1 mm", 4.0)])
def test_least_leg_of_thin_parts(plate, least):
    end = welded(plate=gusset(thickness=plate))
    check = tl.design(member("100x100x6 EA", end), "100 kN")["least weld size"]
    assert check.demand.internal == least


@pytest.mark.parametrize(
    ("section", "most"),
    [("100x100x6 EA", 5.0), ("125x90x5", 5.0)],
    ids=["6 mm: 1 less", "5 mm: the whole"],
)
def test_greatest_leg_along_the_edge(section, most):
    """9.7.3.3: 6 mm and more give t − 1, less gives t."""
    own = tl.section(section) if section.endswith("EA") else _thin()
    check = tl.design(member(own, welded(leg_size="5 mm")), "50 kN")["greatest weld size"]
    assert (check.demand.internal, check.capacity.internal, check.clause) == (5.0, most, "9.7.3.3")
    assert check.passes
    over = tl.design(member(own, welded(leg_size="5.1 mm")), "50 kN")
    assert not over["greatest weld size"].passes
    assert over.word == "FAIL"


def _thin():
    from tensionlib.steel import by_dimensions

    return by_dimensions("angle", b1="125 mm", b2="90 mm", t="5 mm")


def test_least_length_is_four_legs():
    calc = tl.design(member(end=welded(leg_size="8 mm", length_2="31 mm")), "50 kN")
    check = calc["least weld length"]
    assert (check.demand.internal, check.capacity.internal) == (32.0, 31.0)
    assert (check.clause, check.verdict) == ("9.7.3.5", "fail")
