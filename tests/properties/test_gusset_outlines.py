"""What must hold for any outline of a gusset: the same answer turned, mirrored, scaled or counted
from another corner, and the same as a polygon library finds by other means."""

from __future__ import annotations

import math

import pytest
import shapely
from hypothesis import assume, event, given, settings
from hypothesis import strategies as st

from tensionlib.errors import InputError
from tensionlib.joints.gusset_shape import GussetPart, GussetShape
from tensionlib.quantities import ANGLE, LENGTH, quantity

TAN_30 = math.tan(math.pi / 6)
FAR = 1e4

usual = settings(derandomize=True, deadline=None, max_examples=200)


def built(corners, supported, at=(0.0, 0.0), angle=0.0):
    return GussetShape(
        [(quantity(x, LENGTH), quantity(y, LENGTH)) for x, y in corners],
        supported,
        (quantity(at[0], LENGTH), quantity(at[1], LENGTH)),
        quantity(angle, ANGLE),
    )


def moved(points, turn, x, y, scale=1.0):
    cos, sin = scale * math.cos(turn), scale * math.sin(turn)
    return [(u * cos - v * sin + x, u * sin + v * cos + y) for u, v in points]


@st.composite
def outlines(draw):
    """Three to eight corners round the member's end, hollow or not, each seen from it; some edges
    supported. Coordinates are the end's own, whole mm."""
    n = draw(st.integers(3, 8))
    bearings = sorted(draw(st.lists(st.integers(0, 359), min_size=n, max_size=n, unique=True)))
    gaps = [(b - a) % 360 for a, b in zip(bearings, bearings[1:] + bearings[:1], strict=True)]
    assume(max(gaps) < 175 and min(gaps) > 4)
    corners = []
    for bearing in bearings:
        r = draw(st.integers(40, 500))
        at = math.radians(bearing)
        corners.append((round(r * math.cos(at)), round(r * math.sin(at))))
    assume(shapely.Polygon(corners).exterior.distance(shapely.Point(0, 0)) > 1.0)
    assume(shapely.LinearRing(corners).is_simple)
    supported = draw(st.lists(st.integers(0, n - 1), max_size=n - 1, unique=True))
    return corners, tuple(supported)


def places(draw, polygon, count):
    """Points inside a polygon, whole mm, not nearer than 1 to its edges."""
    left, low, right, high = (int(limit) for limit in polygon.bounds)
    found = []
    for _ in range(count):
        at = draw(st.tuples(st.integers(left, right), st.integers(low, high)))
        if polygon.contains(shapely.Point(at)) and polygon.exterior.distance(shapely.Point(at)) > 1:
            found.append(tuple(map(float, at)))
    return found


@st.composite
def joints(draw):
    """An outline and fasteners inside it, the last row in one piece with the member's end."""
    corners, supported = draw(outlines())
    polygon = shapely.Polygon(corners)
    starts = places(draw, polygon, 6)
    assume(len(starts) > 0)
    u_last = min(u for u, _ in starts)
    low, high = bounds(starts, u_last)
    middle = min(max(0.0, low), high)
    assume(polygon.contains(shapely.Point(u_last, middle)))
    assume(polygon.exterior.distance(shapely.Point(u_last, middle)) > 1e-3)
    return corners, supported, starts, u_last


def bounds(starts, u_last):
    return (
        min(v - (u - u_last) * TAN_30 for u, v in starts),
        max(v + (u - u_last) * TAN_30 for u, v in starts),
    )


def first_stretch(polygon, start, end):
    """The stretch of a segment that begins at `start` and stays on a polygon."""
    ray = shapely.LineString([start, end])
    on = shapely.intersection(polygon, ray)
    pieces = on.geoms if hasattr(on, "geoms") else [on]
    return min(pieces, key=lambda piece: piece.distance(shapely.Point(start))).length


@usual
@given(st.data(), outlines(), st.integers(0, 359))
def test_a_ray_is_as_long_as_the_stretch_inside(data, drawn, bearing):
    corners, supported = drawn
    polygon = shapely.Polygon(corners)
    shape = built(corners, supported)
    du, dv = math.cos(math.radians(bearing)), math.sin(math.radians(bearing))
    for u, v in places(data.draw, polygon, 3):
        hit = shape.ray(u, v, du, dv)
        end = (u + FAR * du, v + FAR * dv)
        assert hit.distance == pytest.approx(first_stretch(polygon, (u, v), end), abs=1e-5)
        at = shapely.Point(u + hit.distance * du, v + hit.distance * dv)
        assert shapely.LineString(shape.edge(hit.edge)).distance(at) < 1e-6


@usual
@given(outlines(), st.integers(-600, 600), st.integers(-600, 600))
def test_no_ray_begins_outside(drawn, u, v):
    corners, supported = drawn
    polygon = shapely.Polygon(corners)
    assume(polygon.distance(shapely.Point(u, v)) > 1e-3)
    shape = built(corners, supported)
    for du, dv in ((1.0, 0.0), (-1.0, 0.0), (0.0, 1.0), (0.0, -1.0)):
        with pytest.raises(InputError, match="is not on it"):
            shape.ray(float(u), float(v), du, dv)


@usual
@given(joints())
def test_the_width_is_what_is_left_of_the_spread(drawn):
    """By areas: the triangle of the spread on either side less the gusset, and the line across cut
    by the gusset."""
    corners, supported, starts, u_last = drawn
    polygon = shapely.Polygon(corners)
    low, high = bounds(starts, u_last)
    middle = min(max(0.0, low), high)
    ends = []
    for sign, limit in ((-1.0, low), (1.0, high)):
        u, v = max(starts, key=lambda at: sign * at[1] + at[0] * TAN_30)
        end = (u_last, middle + sign * FAR)
        reach = middle + sign * first_stretch(polygon, (u_last, middle), end)
        expected = sign * min(sign * limit, sign * reach)
        if u > u_last:
            inner = max(sign * v, sign * middle) * sign
            spread = shapely.Polygon([(u, v), (u_last, inner), (u_last, limit)])
            lost = shapely.difference(spread, polygon)
            for piece in lost.geoms if hasattr(lost, "geoms") else [lost]:
                if piece.area > 1e-6:
                    nearest = min(sign * y for _, y in shapely.get_coordinates(piece))
                    expected = sign * min(sign * expected, nearest)
        ends.append(expected)
    event(f"{sum(map(int, (ends[0] > low + 0.01, ends[1] < high - 0.01)))} sides cut")
    width = width_or_none(built(corners, supported), starts, u_last)
    if width is None:
        assert ends[1] - ends[0] < 1e-2
        return
    # What the spread loses by less than that at its tip has no area to speak of.
    assert (width.low, width.high) == pytest.approx(ends, abs=1e-2)
    assert (width.cut_low != "", width.cut_high != "") == (
        width.low > low + 1e-9,
        width.high < high - 1e-9,
    )


def width_or_none(shape, starts, u_last):
    """The width, or None where it is refused because the outline leaves none."""
    try:
        return shape.width(starts, u_last)
    except InputError as error:
        if "leaves no width for the force" not in str(error):
            raise
        event("no width left")
        return None


@usual
@given(joints())
def test_the_width_is_never_more_than_the_ideal_or_the_chord(drawn):
    corners, supported, starts, u_last = drawn
    width = width_or_none(built(corners, supported), starts, u_last)
    assume(width is not None)
    low, high = bounds(starts, u_last)
    assert low - 1e-9 <= width.low <= width.high <= high + 1e-9
    across = shapely.LineString([(u_last, -FAR), (u_last, FAR)])
    chord = shapely.intersection(shapely.Polygon(corners), across).length
    assert width.width <= chord + 1e-6


@usual
@given(joints(), st.integers(-180, 180), st.integers(-2000, 2000), st.integers(-2000, 2000))
def test_turning_and_moving_everything_changes_nothing(drawn, degrees, x, y):
    corners, supported, starts, u_last = drawn
    turn = math.radians(degrees)
    plain = built(corners, supported)
    other = built(moved(corners, turn, x, y), supported, (x, y), turn)
    assert_same(plain, other, starts, u_last)


@usual
@given(joints(), st.integers(1, 7), st.booleans())
def test_it_is_all_one_from_which_corner_and_which_way_they_are_counted(drawn, first, back):
    corners, supported, starts, u_last = drawn
    n = len(corners)
    first %= n
    turned, held = corners[first:] + corners[:first], [(i - first) % n for i in supported]
    if back:
        turned, held = turned[::-1], [(n - 2 - i) % n for i in held]
    assert_same(built(corners, supported), built(turned, tuple(held)), starts, u_last)


def assert_same(one, other, starts, u_last):
    a, b = width_or_none(one, starts, u_last), width_or_none(other, starts, u_last)
    assert (a is None) == (b is None)
    assume(a is not None)
    assert (a.low, a.high) == pytest.approx((b.low, b.high), abs=1e-6)
    for mine, yours in zip(one.strips(u_last, a), other.strips(u_last, b), strict=True):
        assert (mine is None) == (yours is None)
        assert mine is None or mine == pytest.approx(yours, abs=1e-4)
    lengths = [sorted(length for _, length in each.free_edges()) for each in (one, other)]
    assert lengths[0] == pytest.approx(lengths[1])
    runs = [
        sorted((r.length, r.along, r.square, r.lever) for r in each.support_runs())
        for each in (one, other)
    ]
    for mine, yours in zip(*runs, strict=True):
        assert mine == pytest.approx(yours, abs=1e-6)


@usual
@given(joints())
def test_the_mirror_image_swaps_the_sides(drawn):
    corners, supported, starts, u_last = drawn
    there = built(corners, supported)
    mirror = built([(u, -v) for u, v in corners], supported)
    a = width_or_none(there, starts, u_last)
    b = width_or_none(mirror, [(u, -v) for u, v in starts], u_last)
    assert (a is None) == (b is None)
    assume(a is not None)
    assert (a.low, a.high) == pytest.approx((-b.high, -b.low), abs=1e-9)
    assert (bool(a.cut_low), bool(a.cut_high)) == (bool(b.cut_high), bool(b.cut_low))


@usual
@given(joints(), st.sampled_from([0.5, 2.0, 7.0]))
def test_every_length_grows_with_the_gusset(drawn, k):
    corners, supported, starts, u_last = drawn
    one = built(corners, supported)
    other = built(moved(corners, 0.0, 0.0, 0.0, k), supported)
    a = width_or_none(one, starts, u_last)
    b = width_or_none(other, [(k * u, k * v) for u, v in starts], k * u_last)
    assert (a is None) == (b is None)
    assume(a is not None)
    assert (k * a.low, k * a.high) == pytest.approx((b.low, b.high), abs=1e-4)
    assert [k * length for _, length in one.free_edges()] == pytest.approx(
        [length for _, length in other.free_edges()]
    )
    for mine, yours in zip(one.support_runs(), other.support_runs(), strict=True):
        assert (k * mine.length, k * mine.lever) == pytest.approx(
            (yours.length, yours.lever), abs=1e-9
        )
        assert (mine.along, mine.square) == pytest.approx((yours.along, yours.square), abs=1e-9)


@usual
@given(joints())
def test_strips_end_on_a_support_with_plate_all_the_way(drawn):
    corners, supported, starts, u_last = drawn
    polygon = shapely.Polygon(corners)
    shape = built(corners, supported)
    width = width_or_none(shape, starts, u_last)
    assume(width is not None and width.width > 1e-3)
    held = [shapely.LineString(shape.edge(i)) for i in supported]
    free = [shapely.LineString(shape.edge(i)) for i in range(len(corners)) if i not in supported]
    # A hair inside, for the other library to see the point on the gusset.
    inset = 1e-6
    places_of = (width.low + inset, (width.low + width.high) / 2, width.high - inset)
    for v, strip in zip(places_of, shape.strips(u_last, width), strict=True):
        event("a support behind it" if strip is not None else "a free edge behind it")
        length = first_stretch(polygon, (u_last, v), (u_last - FAR, v))
        end = shapely.Point(u_last - length, v)
        if strip is None:
            assert min(edge.distance(end) for edge in free) < 1e-4
        else:
            assert strip == pytest.approx(length, abs=1e-4)
            assert min(edge.distance(end) for edge in held) < 1e-4


@usual
@given(outlines(), st.integers(0, 7), st.integers(1, 9))
def test_a_corner_set_on_a_straight_edge_changes_no_free_edge(drawn, edge, tenths):
    corners, supported = drawn
    edge %= len(corners)
    assume(edge not in supported)
    (a, b), (c, d) = corners[edge], corners[(edge + 1) % len(corners)]
    k = tenths / 10
    more = [*corners[: edge + 1], (a + k * (c - a), b + k * (d - b)), *corners[edge + 1 :]]
    held = tuple(i if i < edge else i + 1 for i in supported)
    one, other = built(corners, supported), built(more, held)
    assert sorted(length for _, length in one.free_edges()) == pytest.approx(
        sorted(length for _, length in other.free_edges())
    )


@usual
@given(outlines())
def test_free_and_supported_edges_make_the_whole_outline(drawn):
    corners, supported = drawn
    shape = built(corners, supported)
    free = math.fsum(length for _, length in shape.free_edges())
    held = math.fsum(run.length for run in shape.support_runs())
    assert free + held == pytest.approx(shapely.Polygon(corners).length)


@usual
@given(outlines(), st.integers(-180, 180))
def test_the_weld_of_a_support_is_in_balance_with_the_tension(drawn, degrees):
    """In the gusset's own axes: parts and moment of a unit tension by cross and dot products."""
    corners, supported = drawn
    angle = math.radians(degrees)
    pull = (math.cos(angle), math.sin(angle))
    for run in built(corners, supported, (0.0, 0.0), angle).support_runs():
        (a, b), (c, d) = corners[run.edge], corners[(run.edge + 1) % len(corners)]
        length = math.hypot(c - a, d - b)
        along = abs(pull[0] * (c - a) + pull[1] * (d - b)) / length
        moment = abs((a + c) / 2 * pull[1] - (b + d) / 2 * pull[0])
        assert (run.length, run.along) == pytest.approx((length, along), abs=1e-9)
        assert math.hypot(run.along, run.square) == pytest.approx(1.0)
        assert run.lever == pytest.approx(moment, abs=1e-6)


@usual
@given(st.data(), outlines())
def test_a_part_measures_to_free_edges_only(data, drawn):
    corners, supported = drawn
    polygon = shapely.Polygon(corners)
    shape = built(corners, supported)
    part = GussetPart(shape, 12.0, 600.0)
    open_part = GussetPart(built(corners, ()), 12.0, 600.0)
    for u, v in places(data.draw, polygon, 3):
        x, y = part.to_part(u, v)
        assert 0.0 <= y <= part.width
        for to, du, dv in (("to_end", 1, 0), ("to_low", 0, -1), ("to_high", 0, 1)):
            got, through = getattr(part, to)(x, y), getattr(open_part, to)(x, y)
            end = (u + FAR * du, v + FAR * dv)
            assert through == pytest.approx(first_stretch(polygon, (u, v), end), abs=1e-5)
            event(f"{'a support' if math.isinf(got) else 'a free edge'} {to}")
            held = shape.ray(u, v, float(du), float(dv)).edge in supported
            assert got == (math.inf if held else through)


@usual
@given(st.data(), outlines())
def test_edge_distance_is_that_of_the_free_edges(data, drawn):
    corners, supported = drawn
    shape = built(corners, supported)
    free = [shapely.LineString(shape.edge(i)) for i in range(len(corners)) if i not in supported]
    for u, v in places(data.draw, shapely.Polygon(corners), 3):
        expected = shapely.MultiLineString(free).distance(shapely.Point(u, v))
        assert shape.edge_distance(u, v) == pytest.approx(expected)


@usual
@given(
    st.lists(st.tuples(st.integers(0, 6), st.integers(0, 6)), min_size=3, max_size=7, unique=True)
)
def test_an_outline_is_taken_where_it_neither_crosses_nor_touches_itself(corners):
    """On a grid so coarse that corners often stand on other edges and edges on other edges."""
    simple = shapely.LinearRing(corners).is_simple and shapely.Polygon(corners).area > 0
    event("taken" if simple else "refused")
    at = shapely.Polygon(corners).representative_point() if simple else shapely.Point(3, 3)
    if simple:
        assert built(corners, (0,), (at.x, at.y)).supported == (0,)
    else:
        with pytest.raises(InputError, match=r"corners: two edges cross or touch"):
            built(corners, (0,), (at.x, at.y))
