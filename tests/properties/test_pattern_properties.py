"""What must hold for an end with any pattern of holes."""

from __future__ import annotations

import math
from dataclasses import replace
from typing import Any

import pytest
from hypothesis import assume, given, settings
from hypothesis import strategies as st

import tensionlib as tl
from tensionlib import Hole, Pattern
from tensionlib.joints.bolt_group import clear_distance
from tensionlib.members import book
from tensionlib.members.pattern import PatternGeometry
from tensionlib.standards import standard
from tests.builders import gusset, member

usual = settings(derandomize=True, deadline=None, max_examples=25)

# The element on the gusset, places across it, and another element with places of its own. Holes
# stand on a grid wide enough for the largest of them.
SECTIONS: dict[str, tuple[str, tuple[int, ...], str, tuple[int, ...]]] = {
    "150x100x12 UA": ("long leg", (45, 85, 125), "short leg", (55,)),
    "100x100x10 EA": ("leg", (35, 75), "other leg", (55,)),
    "2/150x100x12 UA, long legs, gap 12 mm": ("long leg", (45, 85, 125), "short leg", (55,)),
    "250 PFC": ("web", (50, 90, 130, 170), "flange 1", (50,)),
    "150x12 FL": ("plate", (30, 75, 120), "", ()),
}
SPACE = 38  # mm along the force


@st.composite
def ends(draw: Any, sections: tuple[str, ...] = tuple(SECTIONS)) -> tuple[str, tl.BoltedPattern]:
    """A section and an end of two bolts or more on it; distances need not meet any limit."""
    section = draw(st.sampled_from(sections))
    to, across, other, beyond = SECTIONS[section]
    cells = [(i, y, "") for i in range(5) for y in across]
    cells += [(i, y, other) for i in range(3) for y in beyond]
    chosen = draw(st.lists(st.sampled_from(cells), min_size=2, max_size=7, unique=True))
    holes = []
    for k, (i, y, element) in enumerate(chosen, start=1):
        x = 40 + SPACE * i + draw(st.integers(-3, 3))
        diameter = draw(st.sampled_from([None, None, 23, 26, 28]))
        bolt = draw(st.integers(0, 5)) > 0
        size = None if diameter is None else f"{diameter} mm"
        place = f"{y + draw(st.integers(-2, 2))} mm"
        holes.append(Hole(str(k), f"{x} mm", place, element, bolt, diameter=size))
    assume(sum(hole.bolt and not hole.element for hole in holes) >= 2)
    end = tl.BoltedPattern(
        to=to,
        bolts=draw(st.sampled_from(["M16 8.8/S", "M20 8.8/S", "M20 8.8/TB"])),
        threads=draw(st.sampled_from(["in shear plane", "out of shear plane"])),
        holes=Pattern(tuple(holes)),
        plate=gusset(thickness="12 mm", width=draw(st.sampled_from([None, "220 mm"]))),
        plate_edge_distance=draw(st.sampled_from([None, "45 mm"])),
        share="elastic"
        if draw(st.booleans()) and not any(hole.element and hole.bolt for hole in holes)
        else "equal",
        block_tension=draw(st.sampled_from(["uniform", "non-uniform"])),
        packing=draw(st.sampled_from([None, "8 mm"])),
    )
    return section, end


def designed(section: str, end: tl.BoltedPattern, force: str = "200 kN", **more: Any) -> Any:
    return tl.design(member(section, end), force, **more)


def used(calc: tl.Calculation) -> dict[tuple[str, str], float]:
    return {(check.part, check.name): check.utilisation for check in calc}


def same(one: tl.Calculation, other: tl.Calculation) -> None:
    first, second = used(one), used(other)
    assert first.keys() == second.keys()
    for key, value in first.items():
        assert math.isclose(value, second[key], rel_tol=1e-9), key


def rupture(calc: tl.Calculation) -> float:
    return float(calc["net section rupture"].capacity.internal)


@usual
@given(ends(), st.randoms(use_true_random=False))
def test_order_and_marks_say_nothing(drawn, rng):
    """The holes in another order under other marks give the same utilisation of every check."""
    section, end = drawn
    holes = list(end.holes.holes)
    names = [f"B{k}" for k in range(len(holes))]
    rng.shuffle(names)
    # The element on the gusset comes first where parts are listed; order within it is free.
    renamed = [replace(hole, mark=name) for hole, name in zip(holes, names, strict=True)]
    rng.shuffle(renamed)
    same(designed(section, end), designed(section, end.with_holes(Pattern(tuple(renamed)))))


@usual
@given(ends(("150x12 FL",)))
def test_a_flat_seen_from_its_other_edge(drawn):
    section, end = drawn
    turned = tuple(replace(hole, y=f"{150.0 - hole.y.internal!r} mm") for hole in end.holes.holes)
    same(designed(section, end), designed(section, end.with_holes(Pattern(turned))))


@usual
@given(ends(), st.data())
def test_a_bigger_hole_never_makes_the_net_section_stronger(drawn, data):
    section, end = drawn
    mark = data.draw(st.sampled_from([hole.mark for hole in end.holes.holes]))
    bigger = end.holes.reamed(mark, "29 mm")
    before, after = designed(section, end), designed(section, end.with_holes(bigger))
    assert rupture(after) <= rupture(before) * (1 + 1e-12)


@usual
@given(ends(), st.data())
def test_one_hole_more_never_makes_the_net_section_stronger(drawn, data):
    section, end = drawn
    mark = data.draw(st.sampled_from([hole.mark for hole in end.holes.holes]))
    fewer = end.holes.without_hole(mark)
    left = [hole for hole in fewer.holes if hole.bolt]
    assume(sum(not hole.element for hole in left) >= 2)
    # The element it stood in may have lost its only bolt, and the table another row.
    assume({hole.element for hole in left} == {h.element for h in end.holes.holes if h.bolt})
    assert rupture(designed(section, end)) <= rupture(designed(section, end.with_holes(fewer))) * (
        1 + 1e-12
    )


@usual
@given(ends(), st.data())
def test_a_bolt_left_out_never_strengthens_the_bolts(drawn, data):
    """All joints here are short. The force on the bolt that carries most may only grow."""
    section, end = drawn
    end = end.but(share="equal")
    mark = data.draw(st.sampled_from([hole.mark for hole in end.holes.holes if hole.bolt]))
    fewer = end.holes.without_bolt(mark)
    assume(any(hole.bolt and not hole.element for hole in fewer.holes))
    name = "bolt shear, most loaded bolt"
    before, after = designed(section, end), designed(section, end.with_holes(fewer))
    n, m = (calc.value("n_b").internal for calc in (before, after))
    assert m == n - 1
    assert m * after[name].capacity.internal <= n * before[name].capacity.internal
    # Its hole is still there.
    assert after.value("A_n").internal == before.value("A_n").internal


@usual
@given(ends())
def test_credit_for_bolts_behind_never_does_harm(drawn):
    section, end = drawn
    assume(end.share == "equal")
    assume(not any(hole.element and hole.bolt for hole in end.holes.holes))
    plain, credited = designed(section, end), designed(section, end.but(credit_behind=True))
    with_it, without = (c["net section rupture"].utilisation for c in (credited, plain))
    assert with_it <= without * (1 + 1e-12)


@usual
@given(ends())
def test_the_bolt_shown_to_tear_out_is_the_worst_of_all(drawn):
    """Force on each bolt over 0.9·n·(l_c + d_f/2)·t·f_u, the bolt pressing on the member the way
    its own share points."""
    section, end = drawn
    tie = member(section, end)
    calc = designed(section, end)
    shape = PatternGeometry(tie.profile, tie.material, end, standard("NZS 3404"))
    force, d_f = calc.value("N_star_c").internal, shape.fastener.d_f
    shares = {share.mark: share for share in shape.group.shares}
    for grip in shape.grips:
        t, plies = grip.part.strips[0].t, shape.opened.components
        found = []
        for bolt in grip.bolts:
            share = shares[bolt.mark]
            way = (-share.along, -share.across)
            l_c = clear_distance(grip.part, grip.holes, bolt, direction=way)
            found.append(force * share.size / (0.9 * plies * (l_c + d_f / 2) * t * 440))
        check = calc[f"Member at the bolts{grip.where}", "ply tear-out, worst bolt"]
        assert math.isclose(check.utilisation, max(found), rel_tol=1e-9)


@usual
@given(ends())
def test_standards_agree_in_their_numbers(drawn):
    section, end = drawn
    nzs = designed(section, end)
    for name in ("AS 4100:1998", "AS 4100"):
        other = designed(section, end, standard=name)
        assert used(other) == used(nzs)
        assert [c.capacity.internal for c in other] == [c.capacity.internal for c in nzs]


@settings(usual, max_examples=12)
@given(st.lists(ends(), min_size=2, max_size=3), st.floats(1.0, 900.0))
def test_a_sheet_filled_again_is_a_fresh_walk(drawn, force):
    """Bit for bit, whatever was designed before."""
    book._BOOK.clear()
    first = [designed(section, end, "100 kN") for section, end in drawn]
    assert len(first) == len(drawn)
    for section, end in drawn:
        again = designed(section, end, f"{force!r} kN")
        book._BOOK.clear()
        fresh = designed(section, end, f"{force!r} kN")
        assert again.values == fresh.values
        assert again.sheet == fresh.sheet
        assert again.origins == fresh.origins
        assert again.assumptions == fresh.assumptions
        assert again.record() == fresh.record()


@settings(usual, max_examples=12)
@given(ends())
def test_every_reading_is_made(drawn):
    section, end = drawn
    calc = designed(section, end)
    assert calc.heading.mark in calc.html()
    assert calc.latex().count("&") >= len(calc.checks)
    for check in calc:
        assert check.name in calc.text()
    assert len(calc.record()["checks"]) == len(calc.checks) + len(calc.not_covered)


@pytest.mark.parametrize("section", SECTIONS)
def test_the_sections_are_drawn_with_bolts_in_them(section):
    """The strategy's own grid fits every section, so that the properties prove something."""
    to, across, other, beyond = SECTIONS[section]
    holes = tuple(
        Hole(f"{i}.{y}.{element}", f"{40 + SPACE * i} mm", f"{y} mm", element, diameter="28 mm")
        for element, places in (("", across), (other, beyond))
        for i in range(3)
        for y in places
    )
    end = tl.BoltedPattern(to, "M20 8.8/S", "in shear plane", Pattern(holes), gusset())
    calc = designed(section, end)
    assert calc.value("n_b").internal == 3 * (len(across) + len(beyond))
