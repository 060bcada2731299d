"""What must hold for any group of bolts or runs of weld: equilibrium, symmetry, and the clear
distance against a search that knows nothing of how it is computed."""

from __future__ import annotations

import math

import pytest
import shapely
from hypothesis import assume, event, given, settings
from hypothesis import strategies as st

from tensionlib.joints.bolt_group import (
    clear_distance,
    elastic_shares,
    most_loaded,
    worst_tear_out,
)
from tensionlib.joints.fillet_group import (
    Run,
    balanced_runs,
    elastic_stress,
    properties,
    stress_at,
)
from tensionlib.joints.parts import Flat, Opening

usual = settings(derandomize=True, deadline=None, max_examples=600)


def rounded(low, high):
    """Numbers of six decimals: nobody states a length of 1e-230 mm."""
    return st.floats(low, high).map(lambda number: round(number, 6))


@st.composite
def bolt_groups(draw):
    """Two to twelve bolts on different places, some empty holes between them, and a line."""
    places = draw(
        st.lists(
            st.tuples(rounded(20, 900), rounded(-300, 300)), min_size=2, max_size=12, unique=True
        )
    )
    openings = [Opening.round(str(i), x, y, 22.0) for i, (x, y) in enumerate(places)]
    group = elastic_shares(openings, None)
    # Bolts stand apart: ten of them on a spot of a micron carry no moment worth the name.
    assume(group.I_p > 1.0)
    for i in range(draw(st.integers(0, 3))):
        x, y = draw(rounded(20, 900)), draw(rounded(-300, 300))
        empty = Opening.round(f"empty {i}", x, y, 22.0, bolt=False)
        openings.insert(draw(st.integers(0, len(openings))), empty)
    return openings, draw(rounded(-400, 400))


@st.composite
def fillet_groups(draw):
    """One to six runs of any length, way and leg, and a line."""
    runs = []
    for i in range(draw(st.integers(1, 6))):
        x_1, x_2 = draw(rounded(0, 400)), draw(rounded(0, 400))
        y_1, y_2 = draw(rounded(-300, 300)), draw(rounded(-300, 300))
        assume(math.hypot(x_2 - x_1, y_2 - y_1) > 5.0)
        runs.append(Run(str(i), x_1, y_1, x_2, y_2, draw(rounded(3, 16))))
    return runs, draw(rounded(-400, 400))


# Bolts --------------------------------------------------------------------------------------


@usual
@given(bolt_groups())
def test_bolts_balance_the_force(made):
    """Forces, and moments about the corner of the part: -line_y from a unit force along +x."""
    openings, line = made
    group = elastic_shares(openings, line)
    scale = max(s.size for s in group.shares)
    assert len(group.shares) == sum(o.bolt for o in openings)
    assert math.fsum(s.along for s in group.shares) == pytest.approx(1.0, abs=1e-11 * scale)
    assert math.fsum(s.across for s in group.shares) == pytest.approx(0.0, abs=1e-11 * scale)
    places = {o.mark: o for o in openings}
    about_corner = math.fsum(
        places[s.mark].x * s.across - places[s.mark].y * s.along for s in group.shares
    )
    assert about_corner == pytest.approx(-line, abs=1e-8 * scale)
    about_centroid = math.fsum(s.x * s.across - s.y * s.along for s in group.shares)
    assert about_centroid == pytest.approx(group.e, abs=1e-8 * scale)


@usual
@given(bolt_groups())
def test_bolts_turn_as_one_rigid_plate(made):
    """Forces on equal springs follow from a shift and a turn; the turn is the same for any pair."""
    openings, line = made
    group = elastic_shares(openings, line)
    turn = group.e / group.I_p
    first, *others = group.shares
    for share in others:
        assert share.along - first.along == pytest.approx(
            -turn * (share.y - first.y), abs=1e-11 * (1.0 + abs(turn) * 1e3)
        )
        assert share.across - first.across == pytest.approx(
            turn * (share.x - first.x), abs=1e-11 * (1.0 + abs(turn) * 1e3)
        )


@usual
@given(bolt_groups())
def test_a_group_seen_in_the_mirror(made):
    openings, line = made
    group = elastic_shares(openings, line)
    mirrored = elastic_shares(
        [Opening.round(o.mark, o.x, -o.y, 22.0, bolt=o.bolt) for o in openings], -line
    )
    assert mirrored.e == pytest.approx(-group.e, abs=1e-9)
    for a, b in zip(group.shares, mirrored.shares, strict=True):
        scale = 1e-9 * (1.0 + a.size)
        assert (b.along, b.across) == pytest.approx((a.along, -a.across), abs=scale)


@usual
@given(bolt_groups(), st.data())
def test_the_governing_bolts_govern_in_any_order(made, data):
    openings, line = made
    group = elastic_shares(openings, line)
    a_e = {s.mark: data.draw(rounded(1, 200)) for s in group.shares}
    most, worst = most_loaded(group), worst_tear_out(group, a_e)
    greatest = max(s.size / a_e[s.mark] for s in group.shares)
    assert most.size >= max(s.size for s in group.shares) * (1 - 1e-8)
    assert worst.size / a_e[worst.mark] >= greatest * (1 - 1e-8)
    other = elastic_shares(data.draw(st.permutations(openings)), line)
    assert most_loaded(other).size == pytest.approx(most.size, rel=1e-8)
    again = worst_tear_out(other, a_e)
    assert again.size / a_e[again.mark] == pytest.approx(greatest, rel=1e-8)


# Clear distance -----------------------------------------------------------------------------


@st.composite
def slanted(draw):
    """A plate with holes and slots apart from each other, many of them in the way of the first,
    and the way that one presses."""
    width = draw(rounded(150, 400))
    part = Flat.plain(width, 10.0, low_free=draw(st.booleans()), high_free=draw(st.booleans()))
    slant = st.floats(-math.pi, math.pi).map(lambda a: (math.cos(a), math.sin(a)))
    direction = draw(st.sampled_from([(-1.0, 0.0), (0.0, 1.0), (0.0, -1.0)]) | slant)
    # Within 1e-6 of an axis, what counts as a slant is a question of rounding.
    assume(all(c == 0.0 or abs(c) > 1e-6 for c in direction))
    sizes = st.tuples(rounded(14, 34), rounded(14, 34)) | rounded(14, 34).map(lambda d: (d, d))
    holes: list[Opening] = []
    for i in range(draw(st.integers(2, 7))):
        across, along = draw(sizes)
        if i == 0 or draw(st.booleans()):
            x, y = draw(rounded(20, 300)), draw(rounded(20, width - 20))
        else:
            ahead, aside = draw(rounded(20, 150)), draw(rounded(-40, 40))
            x = holes[0].x + ahead * direction[0] - aside * direction[1]
            y = holes[0].y + ahead * direction[1] + aside * direction[0]
        hole = Opening(str(i), x, y, across, along, draw(st.booleans()))
        if all(_gap(hole, other, 0.0, (0.0, 0.0)) > 0.01 for other in holes):
            holes.append(hole)
    return part, holes, direction


def _middle(hole):
    """The line a disc runs along to cut a slot; a point for a round hole."""
    half = (hole.along - hole.across) / 2
    if half > 0:
        return shapely.LineString([(hole.x - half, hole.y), (hole.x + half, hole.y)])
    if half < 0:
        return shapely.LineString([(hole.x, hole.y + half), (hole.x, hole.y - half)])
    return shapely.Point(hole.x, hole.y)


def _gap(hole, other, moved, direction):
    """Between the edges of two holes, the first one moved along the direction."""
    middle = shapely.affinity.translate(_middle(hole), moved * direction[0], moved * direction[1])
    radii = (min(hole.along, hole.across) + min(other.along, other.across)) / 2
    return middle.distance(_middle(other)) - radii


def _moved_until_it_touches(hole, other, direction):
    """The gap is convex in the way moved: find its least, then where it first is nothing."""
    low, high = 0.0, 800.0
    for _ in range(60):
        a, b = low + (high - low) / 3, high - (high - low) / 3
        if _gap(hole, other, a, direction) <= _gap(hole, other, b, direction):
            high = b
        else:
            low = a
    least = _gap(hole, other, low, direction)
    # A hole that is only grazed may count on one side of the comparison and not on the other.
    assume(abs(least) > 1e-3)
    if least > 0.0:
        return math.inf
    near, far = 0.0, low
    for _ in range(50):
        middle = (near + far) / 2
        if _gap(hole, other, middle, direction) > 0.0:
            near = middle
        else:
            far = middle
    return near


def _moved_to_the_edge(part, hole, direction):
    """By the outline of the hole, point by point: the first to arrive at a free edge."""
    radius = min(hole.along, hole.across) / 2
    c_x, c_y = (hole.along / 2 - radius), (hole.across / 2 - radius)
    found = math.inf
    for k in range(360):
        a = math.tau * k / 360
        for side_x in (-c_x, c_x):
            for side_y in (-c_y, c_y):
                x = hole.x + side_x + radius * math.cos(a)
                y = hole.y + side_y + radius * math.sin(a)
                if direction[0] < 0.0:
                    found = min(found, x / -direction[0])
                if direction[1] < 0.0 and part.low_free:
                    found = min(found, y / -direction[1])
                if direction[1] > 0.0 and part.high_free:
                    found = min(found, (part.width - y) / direction[1])
    return found


@settings(usual, max_examples=500)
@given(slanted())
def test_clear_distance_is_how_far_the_hole_can_be_moved(made):
    part, holes, direction = made
    bolt, *others = holes
    found = clear_distance(part, holes, bolt, direction=direction)
    to_edge = _moved_to_the_edge(part, bolt, direction)
    to_holes = (_moved_until_it_touches(bolt, other, direction) for other in others)
    expected = min([to_edge, *to_holes])
    event("a hole" if expected < to_edge else "an edge" if expected < math.inf else "nothing")
    assert found == pytest.approx(expected, rel=1e-6, abs=1e-5)


@settings(usual, max_examples=500)
@given(slanted(), st.data())
def test_one_more_hole_never_adds_clear_distance(made, data):
    part, holes, direction = made
    bolt, *others = holes
    fewer = [o for o in others if data.draw(st.booleans())]
    with_all = clear_distance(part, holes, bolt, direction=direction)
    assert 0.0 <= with_all <= clear_distance(part, fewer, bolt, direction=direction)


# Welds --------------------------------------------------------------------------------------


def _over_the_throats(group, line, of):
    """Integral of a product of two linear fields over all throats, by Simpson: exact."""
    total = []
    for run in group.runs:
        points = (
            (run.x_1, run.y_1),
            ((run.x_1 + run.x_2) / 2, (run.y_1 + run.y_2) / 2),
            (run.x_2, run.y_2),
        )
        for weight, (x, y) in zip((1, 4, 1), points, strict=True):
            along, across = stress_at(group, line, x - group.x_c, y - group.y_c)
            total.append(weight / 6 * run.length * run.throat * of(x, y, along, across))
    return math.fsum(total)


@usual
@given(fillet_groups())
def test_welds_balance_the_force(made):
    runs, line = made
    group = properties(runs)
    scale = elastic_stress(group, line).size * group.area
    assert _over_the_throats(group, line, lambda x, y, a, c: a) == pytest.approx(
        1.0, abs=1e-11 * scale
    )
    assert _over_the_throats(group, line, lambda x, y, a, c: c) == pytest.approx(
        0.0, abs=1e-11 * scale
    )
    assert _over_the_throats(group, line, lambda x, y, a, c: x * c - y * a) == pytest.approx(
        -line, abs=1e-8 * scale
    )


@usual
@given(fillet_groups(), st.floats(0, 1))
def test_no_point_of_the_weld_is_stressed_more_than_the_peak(made, way):
    runs, line = made
    group = properties(runs)
    peak = elastic_stress(group, line)
    assert peak.size == pytest.approx(
        math.hypot(*stress_at(group, line, peak.x, peak.y)), rel=1e-12
    )
    for run in runs:
        x = run.x_1 + way * (run.x_2 - run.x_1) - group.x_c
        y = run.y_1 + way * (run.y_2 - run.y_1) - group.y_c
        assert math.hypot(*stress_at(group, line, x, y)) <= peak.size * (1 + 1e-8)


@usual
@given(fillet_groups(), st.floats(0.1, 0.9))
def test_a_run_laid_in_two_pieces_is_the_same_weld(made, way):
    runs, line = made
    first, *others = runs
    x = first.x_1 + way * (first.x_2 - first.x_1)
    y = first.y_1 + way * (first.y_2 - first.y_1)
    pieces = [
        Run("piece 1", first.x_1, first.y_1, x, y, first.leg),
        Run("piece 2", x, y, first.x_2, first.y_2, first.leg),
    ]
    whole, split = properties(runs), properties([*pieces, *others])
    assert split.length == pytest.approx(whole.length, rel=1e-10)
    assert split.area == pytest.approx(whole.area, rel=1e-10)
    assert split.I_p == pytest.approx(whole.I_p, rel=1e-9)
    assert elastic_stress(split, line).size == pytest.approx(
        elastic_stress(whole, line).size, rel=1e-8
    )


@usual
@given(fillet_groups())
def test_many_bolts_along_the_runs_act_as_the_weld(made):
    """A weld of one throat against a bolt on each short piece: the bolts' shares over their
    pieces' throat area close in on the weld's stress."""
    runs, line = made
    runs = [Run(r.mark, r.x_1, r.y_1, r.x_2, r.y_2, 6.0) for r in runs]
    group = properties(runs)
    piece = group.length / 400
    bolts = []
    for run in runs:
        count = round(run.length / piece)
        assume(count > 20)
        for k in range(count):
            way = (k + 0.5) / count
            x, y = run.x_1 + way * (run.x_2 - run.x_1), run.y_1 + way * (run.y_2 - run.y_1)
            bolts.append(Opening.round(f"{run.mark} {k}", x, y, 1.0))
    shares = elastic_shares(bolts, line)
    by_bolts = most_loaded(shares).size * len(bolts) / group.area
    assert by_bolts == pytest.approx(elastic_stress(group, line).size, rel=0.06)


@usual
@given(rounded(1, 200), rounded(1, 200), st.floats(0, 1), st.floats(0, 1), rounded(0, 900))
def test_balanced_runs_put_the_centroid_on_the_line(low, high, part, place, more):
    """The runs are laid as welds and their centroid computed from them."""
    width = low + high
    transverse = round(part * width, 6)
    at = transverse / 2 + place * (width - transverse)
    least = max(transverse * at / low, transverse * (width - at) / high)
    total = least + more + 0.001
    heel, toe = balanced_runs(low, high, total, transverse, at)
    assert min(heel, toe) >= 0.0
    assert heel + toe + transverse == pytest.approx(total, rel=1e-9)
    runs = [
        Run("heel", 0, 0, heel, 0, 6.0) if heel > 1e-9 else None,
        Run("toe", 0, width, toe, width, 6.0) if toe > 1e-9 else None,
        Run("end", 0, at - transverse / 2, 0, at + transverse / 2, 6.0) if transverse else None,
    ]
    assert properties([run for run in runs if run]).y_c == pytest.approx(low, rel=1e-6)
