"""Every way the walk to NZS 3404 can turn: long joints, edges, single bolts, friction, two ends."""

from __future__ import annotations

import pytest

import tensionlib as tl
from tests.builders import bolted, gusset, member, two_lines, welded


@pytest.mark.parametrize(
    ("per_line", "pitch", "k_r"),
    [
        (1, None, 1.0),
        (5, "75 mm", 1.0),
        (5, "75.1 mm", 1.075 - 300.4 / 4000),
        (7, "75 mm", 1.075 - 450.0 / 4000),
        (11, "130 mm", 1.075 - 1300.0 / 4000),
        (11, "130.1 mm", 0.75),
        (21, "75 mm", 0.75),
    ],
)
def test_long_joint_factor(per_line, pitch, k_r):
    """Table 9.3.2.1: 1.0 to 300 mm, 1.075 − L_j/4000 to 1300 mm, 0.75 beyond."""
    end = bolted(per_line=per_line, pitch=pitch, plate=gusset(width="200 mm"))
    calc = tl.design(member(end=end), "50 kN")
    assert calc.value("k_r").internal == pytest.approx(k_r, rel=1e-12)
    assert calc["bolt shear"].capacity.internal == pytest.approx(
        0.8 * per_line * 0.62 * 830 * k_r * 225
    )
    assert calc["bolt shear"].clause == "9.3.2.1"


@pytest.mark.parametrize(
    ("edge_kind", "factor"), [("sheared", 1.75), ("machine cut", 1.50), ("rolled", 1.25)]
)
def test_least_edge_by_its_kind(edge_kind, factor):
    """Table 9.6.2; an M20 needs 35, 30 or 25 mm, and the angle's toe, rolled, 25 mm."""
    due = factor * 20
    end = bolted(edge_kind=edge_kind, end_distance=f"{due} mm", plate_edge_distance=f"{due} mm")
    calc = tl.design(member(end=end), "50 kN")
    for name in (
        "least end distance, member",
        "least end distance, gusset",
        "least edge distance, gusset",
    ):
        check = calc[name]
        assert (check.demand.internal, check.capacity.internal) == (due, due)
        assert (check.clause, check.verdict, check.utilisation) == ("Table 9.6.2", "pass", 1.0)
    assert calc["least edge distance, member"].demand.internal == 25.0
    short = tl.design(member(end=end.but(end_distance=f"{due - 0.1} mm")), "50 kN")
    assert short["least end distance, member"].verdict == "fail"
    assert short.word == "FAIL"


@pytest.mark.parametrize(
    ("t_p", "pitch_limit", "edge_limit", "gusset_limit"),
    [("8 mm", 120.0, 114.0, 96.0), ("12 mm", 142.5, 114.0, 144.0), ("16 mm", 142.5, 114.0, 150.0)],
)
def test_greatest_distances(t_p, pitch_limit, edge_limit, gusset_limit):
    """9.6.3: 15 times the thinner ply, to 200; 9.6.4: 12 times the ply, to 150. Angle 9.5 thick."""
    calc = tl.design(member(end=bolted(plate=gusset(thickness=t_p))), "50 kN")
    assert calc["greatest pitch"].capacity.internal == pitch_limit
    assert calc["greatest pitch"].clause == "9.6.3"
    assert calc["greatest end distance, member"].capacity.internal == edge_limit
    assert calc["greatest end distance, gusset"].capacity.internal == gusset_limit
    assert calc["greatest end distance, gusset"].clause == "9.6.4"


def test_greatest_distances_of_thick_plies_are_the_clause_limits():
    end = two_lines(to="plate", plate=gusset(thickness="20 mm"), pitch="201 mm")
    calc = tl.design(member("200x16 FL", end), "50 kN")
    assert calc["greatest pitch"].capacity.internal == 200.0
    assert calc["greatest pitch"].verdict == "fail"
    assert calc["greatest end distance, member"].capacity.internal == 150.0


def test_least_pitch():
    calc = tl.design(member(end=bolted(pitch="49 mm")), "50 kN")
    check = calc["least pitch"]
    assert (check.demand.internal, check.capacity.internal, check.clause) == (50.0, 49.0, "9.6.1")
    assert calc.word == "FAIL"


def test_single_bolt_needs_the_width_of_the_gusset():
    alone = bolted(bolts="M30 8.8/S", per_line=1, pitch=None, end_distance="55 mm")
    calc = tl.design(member(end=alone), "50 kN")
    (line,) = calc.not_covered
    assert (line.part, line.clause) == ("Gusset", "practice")
    assert "state the gusset's width" in line.note
    assert calc.word == "NOT COVERED"
    stated = tl.design(member(end=alone.but(plate=gusset(width="120 mm"))), "50 kN")
    assert stated.not_covered == ()
    assert stated["Gusset", "yield"].capacity.internal == pytest.approx(0.9 * 120 * 12 * 260)
    assert stated["Gusset", "rupture"].capacity.internal == pytest.approx(
        0.9 * 0.85 * (120 - 33) * 12 * 410
    )
    assert stated.word == "PASS"


def test_one_row_across_the_force():
    """Two bolts side by side have no length to spread the force: the width is their distance."""
    calc = tl.design(member("150x12 FL", two_lines(to="plate", per_line=1, pitch=None)), "50 kN")
    assert calc["Gusset", "yield"].capacity.internal == pytest.approx(0.9 * 70 * 12 * 260)


def test_one_row_through_both_flanges_has_no_length_to_cover_the_depth():
    end = two_lines(to="both flanges", line_spacing="90 mm", per_line=1, pitch=None)
    calc = tl.design(member("150 UC 30.0", end), "50 kN")
    assert [(line.title, line.clause) for line in calc.not_covered] == [
        ("net section rupture", "7.3.2")
    ]
    assert not calc.passes


def test_a_narrow_gusset_clips_the_spread():
    narrow = tl.design(member(end=bolted(plate=gusset(width="100 mm"))), "50 kN")
    assert narrow["Gusset", "yield"].capacity.internal == pytest.approx(0.9 * 100 * 12 * 260)
    wide = tl.design(member(end=bolted(plate=gusset(width="400 mm"))), "50 kN")
    free = tl.design(member(end=bolted()), "50 kN")
    assert wide["Gusset", "yield"].capacity == free["Gusset", "yield"].capacity
    assert any("as wide as the force spreads" in text for text in free.assumptions)
    assert not any("as wide as the force spreads" in text for text in wide.assumptions)


def test_friction_bolts_without_a_force_in_service_are_not_covered():
    calc = tl.design(member(end=bolted(bolts="M20 8.8/TF")), "50 kN")
    (line,) = calc.not_covered
    assert (line.part, line.title, line.clause) == ("Bolts", "slip", "9.3.3.1")
    assert calc.word == "NOT COVERED"
    assert calc["bolt shear"].verdict == "pass"
    assert not calc.passes


def test_a_failing_check_outranks_what_is_not_covered():
    calc = tl.design(member(end=bolted(bolts="M20 8.8/TF")), "900 kN")
    assert calc.word == "FAIL"


@pytest.mark.parametrize(
    ("bolts", "hole"), [("M20 8.8/S", 22.0), ("M24 8.8/S", 26.0), ("M30 8.8/S", 33.0)]
)
def test_standard_holes(bolts, hole):
    """14.3.5.2: 2 mm over the bolt to M24, 3 mm above; a stated clearance goes first."""
    end = bolted(bolts=bolts, pitch="100 mm", end_distance="60 mm")
    assert tl.design(member("150x90x12 UA", end), "50 kN").value("d_h").internal == hole
    stated = tl.design(member("150x90x12 UA", end.but(clearance="1 mm")), "50 kN")
    assert stated.value("d_h").internal == float(bolts[1:3]) + 1.0


@pytest.mark.parametrize(("force", "action"), [("0 kN", 0.3), ("1 kN", 0.3), ("400 kN", None)])
def test_minimum_design_action(force, action):
    """9.1.4: 0.3 of the member's capacity; the member itself is proven for N* alone."""
    calc = tl.design(member(), force)
    A_n = calc.value("A_n").internal
    phiN_t = 0.9 * 0.85 * 0.85 * A_n * 440
    assert calc.value("phiN_t").internal == pytest.approx(phiN_t)
    due = 400e3 if action is None else action * phiN_t
    assert calc["bolt shear"].demand.internal == pytest.approx(due)
    assert calc["net section rupture"].demand.internal == float(force.split()[0]) * 1e3


def test_two_different_ends():
    """Bolts at one end, welds at the other: each has its parts, and the weaker net section rules.

    With 1813 mm² gross, holes of 209 mm² leave the bolted end the weaker.
    """
    calc = tl.design(member(far_end=welded()), "0 kN")
    parts = [part["title"] for part in calc.record()["parts"]]
    assert {"End 1: Bolts", "End 2: Welds", "End 1: Gusset", "End 2: Gusset"} <= set(parts)
    weak = calc["End 1: Net section", "net section rupture"].capacity.internal
    strong = calc["End 2: Net section", "net section rupture"].capacity.internal
    A_g = calc.value("A_g").internal
    assert strong == pytest.approx(0.9 * 0.85 * 0.85 * A_g * 440)
    assert weak == pytest.approx(0.9 * 0.85 * 0.85 * (A_g - 22 * 9.5) * 440)
    assert calc.value("phiN_t").internal == weak
    for name in (("End 1: Bolts", "bolt shear"), ("End 2: Welds", "weld")):
        assert calc[name].demand.internal == pytest.approx(0.3 * weak)
    assert "both ends are connected in the same way" not in calc.assumptions


@pytest.mark.parametrize(
    ("section", "end"),
    [
        ("310 UB 40.4", two_lines(to="web", line_spacing="90 mm", per_line=4)),
        ("155 BT 20.2", bolted(to="web", gauge=None)),
    ],
)
def test_what_the_table_has_no_row_for(section, end):
    """The web of an I and the stem of a tee: not covered, unless the engineer states k_te."""
    calc = tl.design(member(section, end), "50 kN")
    assert calc.word == "NOT COVERED"
    assert calc.not_covered[0].clause == "7.3.2"
    stated = end.but(k_te=0.7, k_te_reason="x over L of the joint, calculation 12")
    calc = tl.design(member(section, stated), "50 kN")
    assert calc.not_covered == ()
    assert calc["net section rupture"].capacity.internal == pytest.approx(
        0.9 * 0.85 * 0.7 * calc.value("A_n").internal * 440
    )


def test_slenderness_is_advice():
    calc = tl.design(member(length="12 m"), "50 kN")
    check = calc["slenderness"]
    assert (check.kind, check.verdict) == ("advice", "advice")
    assert check.demand.internal == pytest.approx(12000 / tl.section("150x90x10 UA").r_min)
    assert calc.word == "PASS"
