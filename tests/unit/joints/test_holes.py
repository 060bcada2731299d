"""Patterns of holes, and what an end is worth as it was drilled; figures by hand.

150x100x12, f_y 300 and f_u 440 MPa, one line of three M20 at 60 mm from the heel, at 40, 110 and
180 mm, holes of 22 mm. The block to the toe: L 180, h_v 55, b 90, h_t 11.
"""

from __future__ import annotations

from typing import Any

import pytest

import tensionlib as tl
from tensionlib import Hole, Pattern
from tensionlib.errors import InputError, UnitError
from tensionlib.standards.common_as_nzs.hole_sizes import hole_size
from tests.builders import gusset, member

LINE = Pattern.lines(3, ["60 mm"], "40 mm", "70 mm")


def design(holes: Pattern = LINE, *, service: str | None = None, **changes: Any) -> tl.Calculation:
    usual = {
        "to": "long leg",
        "bolts": "M20 8.8/S",
        "threads": "in shear plane",
        "holes": holes,
        "plate": gusset(),
    }
    end = tl.BoltedPattern(**usual | changes)
    return tl.design(member("150x100x12 UA", end), "300 kN", service=service)


def near(value: Any, due: float) -> bool:
    return float(value.internal) == pytest.approx(due, rel=1e-9)


def block(l_gv: float, h_v: float, b_gt: float, h_t: float) -> float:
    """0.75·12·(min(264(L - h); 180 L) + 440(b - h)), N."""
    return 9 * (min(264 * (l_gv - h_v), 180 * l_gv) + 440 * (b_gt - h_t))


def tear_out(l_c: float) -> float:
    """0.9·(l_c + 20/2)·12·440, N."""
    return 0.9 * (l_c + 10) * 12 * 440


MEMBER = "Member at the bolts"
BLOCK, TEAR = (MEMBER, "block shear"), (MEMBER, "ply tear-out, worst bolt")


def places(pattern: Pattern) -> list[tuple[str, float, float]]:
    return [(h.mark, h.x.internal, h.y.internal) for h in pattern.holes]


# Making a pattern -------------------------------------------------------------------------


def test_lines_are_marked_line_by_line():
    two = Pattern.lines(2, ["55 mm", "115 mm"], "40 mm", "70 mm", ["0 mm", "35 mm"], first=5)
    assert places(two) == [
        ("5", 40.0, 55.0),
        ("6", 110.0, 55.0),
        ("7", 75.0, 115.0),
        ("8", 145.0, 115.0),
    ]
    one = Pattern.lines(1, ["45 mm"], "30 mm", element="short leg", first=9)
    assert [(h.mark, h.element) for h in (two + one).holes][-1] == ("9", "short leg")


def test_edits_give_a_new_pattern():
    moved = LINE.moved("2", dx="-6 mm", dy="4 mm")
    assert places(moved)[1] == ("2", 104.0, 64.0)
    assert places(LINE)[1] == ("2", 110.0, 60.0)
    assert [h.bolt for h in LINE.without_bolt("2").holes] == [True, False, True]
    assert [h.mark for h in LINE.without_hole("2").holes] == ["1", "3"]
    assert LINE.reamed("2", "26 mm").holes[1].diameter.internal == 26.0
    assert [x for _, x, _ in places(LINE.end_cut("10 mm"))] == [30.0, 100.0, 170.0]
    assert len(LINE.with_hole(Hole("4", "250 mm", "60 mm")).holes) == 4


def test_a_slot_reamed_round_is_a_round_hole():
    slotted = Pattern((Hole("1", "60 mm", "60 mm", kind="long slot"),))
    assert slotted.reamed("1", "50 mm").holes[0].kind == "standard"


@pytest.mark.parametrize(
    ("d_f", "kind", "size"),
    [
        # Standard d + 2, over M24 d + 3; oversize the greater of 1.25 d and d + 8; slots as wide as
        # a standard hole, short to the greater of 1.33 d and d + 10, long to 2.5 d. From memory.
        (20.0, "standard", (22.0, 22.0)),
        (20.0, "oversize", (28.0, 28.0)),
        (20.0, "short slot", (22.0, 30.0)),
        (20.0, "long slot", (22.0, 50.0)),
        (24.0, "standard", (26.0, 26.0)),
        (30.0, "standard", (33.0, 33.0)),
        (36.0, "oversize", (45.0, 45.0)),
        (36.0, "short slot", (39.0, 47.88)),
    ],
)
def test_sizes_of_holes(d_f, kind, size):
    assert hole_size(d_f, kind) == pytest.approx(size)


# As drilled -------------------------------------------------------------------------------


def test_as_drawn():
    calc = design()
    assert near(calc.value("A_d"), 264.0)
    assert near(calc[BLOCK].capacity, block(180, 55, 90, 11))
    assert near(calc[TEAR].capacity, tear_out(29))


def test_the_end_hole_drilled_6_mm_towards_the_end():
    """e = 34: l_c = 34 - 11 = 23, under the least edge distance 1.75·20 = 35."""
    calc = design(LINE.moved("1", dx="-6 mm"))
    assert near(calc[TEAR].capacity, tear_out(23))
    assert near(calc["least edge distance, member end"].capacity, 34.0)
    assert calc["least edge distance, member end"].verdict == "fail"
    # The gusset's own end lies by bolt 3 and is taken as far as the member's.
    assert near(calc["Gusset", "ply tear-out, worst bolt"].capacity, 0.9 * 33 * 12 * 410)


def test_the_last_hole_drilled_6_mm_short():
    assert near(design(LINE.moved("3", dx="-6 mm"))[BLOCK].capacity, block(174, 55, 90, 11))


def test_the_last_hole_drilled_6_mm_towards_the_toe():
    """Its edge is 84 away; 6 mm aside is less than half a hole, so the line still shears as one."""
    calc = design(LINE.moved("3", dy="6 mm"))
    assert near(calc["least edge distance, member side"].capacity, 84.0)
    assert near(calc[BLOCK].capacity, block(180, 55, 84, 11))
    assert near(calc.value("A_d"), 264.0)


def test_a_bolt_left_out_leaves_its_hole():
    calc = design(LINE.without_bolt("2"))
    assert near(calc["bolt shear, most loaded bolt"].demand, 150e3)
    assert near(calc.value("A_d"), 264.0)
    assert near(calc[BLOCK].capacity, block(180, 55, 90, 11))
    assert near(calc["greatest distance between bolts"].demand, 140.0)
    # Bolt 3 tears into the empty hole, 70 - 22 = 48 away; bolt 1 to the end, 29, is worse.
    assert near(calc[TEAR].capacity, tear_out(29))
    # The gusset has no hole 2, so its bolt 1 has 140 - 22 to bolt 3, which has 29 to the end.
    assert near(calc["Gusset", "ply tear-out, worst bolt"].capacity, 0.9 * 39 * 12 * 410)


def test_an_empty_end_hole_is_in_the_way_of_the_next_bolt():
    """Bolt 2 tears 48 mm to hole 1, not 110 - 11 to the end."""
    assert near(design(LINE.without_bolt("1"))[TEAR].capacity, tear_out(48))


def test_a_hole_not_drilled_leaves_its_steel():
    calc = design(LINE.without_hole("2"))
    assert near(calc["bolt shear, most loaded bolt"].demand, 150e3)
    assert near(calc[BLOCK].capacity, block(180, 33, 90, 11))


def test_a_reamed_hole():
    """Hole 1 of 26: A_d = 312, l_c = 40 - 13; the block along the line loses 26 + 22 + 11."""
    calc = design(LINE.reamed("1", "26 mm"))
    assert near(calc.value("A_d"), 312.0)
    assert near(calc[TEAR].capacity, tear_out(27))
    assert near(calc[BLOCK].capacity, block(180, 59, 90, 11))


def test_the_worst_of_bolts_that_press_askew():
    """Two lines at 80 and 125 mm, 40 and 100 mm from the end; the force at 49.110 mm.

    e = 102.5 - 49.110 = 53.390, I_b = 4·(30² + 22.5²) = 5625. Shares along 0.25 ± 53.39·22.5/5625
    = 0.46356 and 0.03644, across 53.39·30/5625 = 0.28475. Bolt 1 presses with 0.54404 to the end,
    29/(0.46356/0.54404) = 34.034 away: 0.54404/44.034 = 0.01236. Bolt 3 with 0.28707 to the toe,
    14/(0.28475/0.28707) = 14.114: 0.28707/24.114 = 0.01190, so bolt 1 is the worst.
    """
    calc = design(Pattern.lines(2, ["80 mm", "125 mm"], "40 mm", "60 mm"), share="elastic")
    assert calc[TEAR].demand.internal == pytest.approx(0.54404 * 300e3, rel=1e-4)
    assert calc[TEAR].capacity.internal == pytest.approx(tear_out(34.034), rel=1e-4)


def test_the_end_cut_10_mm_short():
    calc = design(LINE.end_cut("10 mm"))
    assert near(calc[TEAR].capacity, tear_out(19))
    assert near(calc[BLOCK].capacity, block(170, 55, 90, 11))


KINDS = [
    # Kind, slot, across the force, half along it, k_h.
    ("oversize", "along", 28, 14, 0.85),
    ("short slot", "along", 22, 15, 0.85),
    ("short slot", "across", 30, 11, 0.85),
    ("long slot", "along", 22, 25, 0.70),
    ("long slot", "across", 50, 11, 0.70),
]


@pytest.mark.parametrize(("kind", "slot", "across", "half", "k_h"), KINDS)
def test_a_hole_of_another_kind_in_a_friction_joint(kind, slot, across, half, k_h):
    """Three bolts slip at 0.7·3·0.35·145·k_h = 106.575·k_h kN."""
    holes = Pattern((Hole("1", "40 mm", "60 mm", kind=kind, slot=slot), *LINE.holes[1:]))
    calc = design(holes, bolts="M20 8.8/TF", service="60 kN")
    assert near(calc.value("A_d"), 12.0 * across)
    assert near(calc[TEAR].capacity, tear_out(40 - half))
    assert near(calc["slip in service"].capacity, 106_575 * k_h)
    assert not calc.not_covered


@pytest.mark.parametrize(("kind", "slot"), [(kind, slot) for kind, slot, *_ in KINDS])
def test_play_along_the_force_is_not_covered_in_bearing(kind, slot):
    holes = Pattern((Hole("1", "40 mm", "60 mm", kind=kind, slot=slot), *LINE.holes[1:]))
    plays = kind == "oversize" or slot == "along"
    for bolts in ("M20 8.8/S", "M20 8.8/TB"):
        calc = design(holes, bolts=bolts)
        found = [line.title for line in calc.not_covered]
        assert found == (["holes with play along the force"] if plays else [])
        if plays:
            assert f"(hole 1, {kind})" in calc.not_covered[0].note
            assert not calc.passes
    # An empty oversize hole plays no part.
    assert not design(holes.without_bolt("1")).not_covered


# Refusals ---------------------------------------------------------------------------------

REFUSED = [
    (lambda: Hole("", "40 mm", "60 mm"), InputError, "mark: got ''; a name is due.*'3'"),
    (lambda: Hole(1, "40 mm", "60 mm"), InputError, "mark: got 1; a name is due"),
    (lambda: Hole("1", 40, "60 mm"), UnitError, "hole 1: x: got 40, a bare number"),
    (lambda: Hole("1", "40 mm", "0 mm"), InputError, "hole 1: y: got 0 mm; it must be above 0 mm"),
    (
        lambda: Hole("1", "40 mm", "60 mm", kind="slotted"),
        InputError,
        "hole 1: kind: got 'slotted'; one of 'standard', 'oversize', 'short slot', 'long slot'",
    ),
    (
        lambda: Hole("1", "40 mm", "60 mm", slot="up"),
        InputError,
        "hole 1: slot: got 'up'; one of 'along', 'across' is due",
    ),
    (
        lambda: Hole("1", "40 mm", "60 mm", kind="long slot", diameter="30 mm"),
        InputError,
        "hole 1: diameter: a slot's size is the standard's; leave it out",
    ),
    (
        lambda: Hole("1", "40 mm", "60 mm", diameter="-3 mm"),
        InputError,
        "hole 1: diameter: got -3 mm; it must be above 0 mm",
    ),
    (lambda: Pattern(()), InputError, r"holes: none; give at least one Hole\(...\)"),
    (lambda: Pattern(list(LINE.holes)), InputError, r"holes: got \[.*a tuple of Hole\(...\)"),
    (lambda: LINE + LINE, InputError, "holes: the mark '1' stands twice; give each its own"),
    (lambda: LINE.with_hole(LINE.holes[2]), InputError, "the mark '3' stands twice"),
    (lambda: LINE.with_hole("4"), InputError, "holes: got .*a tuple of Hole"),
    (lambda: Pattern.lines(0, ["60 mm"], "40 mm"), InputError, "per_line: got 0; .* at least 1"),
    (lambda: Pattern.lines(1, "60 mm", "40 mm"), InputError, "at: got '60 mm'; the place of each"),
    (lambda: Pattern.lines(1, [], "40 mm"), InputError, r"at: got \[\]; the place of each line"),
    (lambda: Pattern.lines(2, ["60 mm"], "40 mm"), InputError, "pitch: missing; .*'70 mm'"),
    (lambda: Pattern.lines(1, ["60 mm"], 40), UnitError, "end_distance: got 40, a bare number"),
    (
        lambda: Pattern.lines(1, ["60 mm"], "40 mm", stagger=["0 mm", "35 mm"]),
        InputError,
        "stagger: got 2 entries; 1, one a line, are due",
    ),
    (lambda: LINE.moved("4"), InputError, "mark: no hole '4'; the pattern has 1, 2, 3"),
    (lambda: LINE.moved("1", dx=6), UnitError, "dx: got 6, a bare number; .*'6 mm'"),
    (lambda: LINE.moved("1", dy="60 mPa"), InputError, "dy: "),
    (lambda: LINE.reamed("1", "0 mm"), InputError, "hole 1: diameter: got 0 mm; .*above 0 mm"),
    (lambda: LINE.end_cut("40 mm"), InputError, "hole 1: x: got 0 mm; it must be above 0 mm"),
    (
        lambda: LINE.without_hole("1").without_hole("2").without_hole("3"),
        InputError,
        "holes: none",
    ),
]


@pytest.mark.parametrize(("make", "error", "message"), REFUSED)
def test_what_is_refused(make, error, message):
    with pytest.raises(error, match=message):
        make()
