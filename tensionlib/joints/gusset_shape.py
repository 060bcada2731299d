"""The gusset's own outline: where the force spreads in it, and what holds it.

End coordinates: u runs along the member from its end towards its body, v across to the left; the
origin is the member's end on the line of its bolts or the middle of its welds. Lengths in mm,
angles in rad. The rules of spreading, interruption and buckling length are common practice, no
source; the rest is plane geometry and statics.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from numbers import Integral

from tensionlib.errors import InputError
from tensionlib.joints.stated import Length, in_mm
from tensionlib.quantities import ANGLE, LENGTH, Quantity, door

Point = tuple[float, float]
_TAN_30 = math.tan(math.pi / 6)
_TINY = 1e-9
_SAME = 1e-6  # mm: places no farther apart than this are one place


@dataclass(frozen=True, slots=True)
class Hit:
    """Where a ray meets the outline: how far, and which edge."""

    distance: float
    edge: int


@dataclass(frozen=True, slots=True)
class Width:
    """The width that counts: its two ends across, and what cut each: "" for nothing, "free edge"
    or "support"."""

    low: float
    high: float
    cut_low: str
    cut_high: str

    @property
    def width(self) -> float:
        return self.high - self.low


@dataclass(frozen=True, slots=True)
class SupportRun:
    """A supported edge: its length, and for a unit tension in the member the parts along and
    square to the edge and the lever of the tension about the edge's middle."""

    edge: int
    length: float
    along: float
    square: float
    lever: float


@dataclass(frozen=True)
class GussetShape:
    """The outline of a gusset in its own axes.

    Parameters
    ----------
    corners : sequence of (length, length)
        In turn round the outline either way, three or more.
    supported : sequence of int
        Edges held by the beam or column, counted from 0; edge i runs from corner i to the next.
    member_at : (length, length)
        Where the member's end lies on the line of its bolts, or in the middle of its welds.
    angle : angle
        From the x axis to the member's direction, from the gusset towards its body.

    Raises
    ------
    InputError
        For fewer than three corners, a corner that stands twice, edges that cross or touch, a
        supported edge that is not there or stands twice, or a member whose end does not lie inside
        the gusset.
    """

    corners: Sequence[tuple[Length, Length]]
    supported: Sequence[int]
    member_at: tuple[Length, Length]
    angle: Quantity | str

    def __post_init__(self) -> None:
        def pair(name: str, value: object) -> tuple[Quantity, Quantity]:
            if not isinstance(value, tuple | list) or len(value) != 2:
                raise InputError(f"{name}: got {value!r}; two lengths are due")
            first, second = (door(name, each, LENGTH, example="120 mm") for each in value)
            return first, second

        for name in ("corners", "supported"):
            value = getattr(self, name)
            if not isinstance(value, Sequence) or isinstance(value, str):
                raise InputError(f"{name}: got {value!r}; a list or tuple is due")
        corners = tuple(pair(f"corner {i}", each) for i, each in enumerate(self.corners))
        if len(corners) < 3:
            raise InputError(f"corners: got {len(corners)}; three or more are due")
        object.__setattr__(self, "corners", corners)
        object.__setattr__(self, "member_at", pair("member_at", self.member_at))
        object.__setattr__(self, "angle", door("angle", self.angle, ANGLE, example="40 deg"))
        last = len(corners) - 1
        for edge in self.supported:
            if not isinstance(edge, Integral) or isinstance(edge, bool) or not 0 <= edge <= last:
                raise InputError(f"supported: got {edge!r}; edges are counted 0 to {last}")
        held = tuple(int(edge) for edge in self.supported)
        for edge in held:
            if held.count(edge) > 1:
                raise InputError(f"supported: edge {edge} stands twice; give each edge once")
        object.__setattr__(self, "supported", held)
        # In the gusset's own axes, so that no turning blurs what touches.
        _check_outline([(in_mm(x), in_mm(y)) for x, y in corners])
        if not _inside(self.outline, (0.0, 0.0)) or self._nearest((0.0, 0.0)).distance < _SAME:
            x, y = self.member_at
            raise InputError(
                f"member_at: got ({x}, {y}), on the gusset's edge or outside; the member's end"
                " lies inside the gusset's outline"
            )

    @cached_property
    def outline(self) -> tuple[Point, ...]:
        """The corners in end coordinates, in their order."""
        turn = float(door("angle", self.angle, ANGLE).internal)
        cos, sin = math.cos(turn), math.sin(turn)
        x_0, y_0 = map(in_mm, self.member_at)
        out = []
        for x, y in self.corners:
            dx, dy = in_mm(x) - x_0, in_mm(y) - y_0
            out.append((dx * cos + dy * sin, -dx * sin + dy * cos))
        return tuple(out)

    def edge(self, i: int) -> tuple[Point, Point]:
        """Ends of an edge in end coordinates."""
        corners = self.outline
        return corners[i], corners[(i + 1) % len(corners)]

    def ray(self, u: float, v: float, du: float, dv: float) -> Hit:
        """From a point of the gusset, in a direction of unit length, to where the gusset ends.

        A ray that only touches a corner goes on, and so does one along an edge that its point lies
        on; one that comes to an edge and would run along it ends there. One that leaves where a
        free and a supported edge meet leaves through the free one.

        Raises
        ------
        InputError
            For a point that is not on the gusset.
        """
        if not self._holds((u, v)):
            raise InputError(f"gusset: the point ({u:g}, {v:g}) mm is not on it")
        met = []
        for i in range(len(self.outline)):
            (a, b), (c, d) = self.edge(i)
            eu, ev = c - a, d - b
            cross = du * ev - dv * eu
            if abs(cross) < _TINY:
                continue
            t = ((a - u) * ev - (b - v) * eu) / cross
            s = ((a - u) * dv - (b - v) * du) / cross
            if t > -_SAME and -_TINY <= s <= 1 + _TINY:
                met.append(Hit(max(t, 0.0), i))
        met.sort(key=lambda hit: hit.distance)
        for k, hit in enumerate(met):
            there = [h for h in met if abs(h.distance - hit.distance) < _SAME]
            beyond = [h.distance for h in met[k:] if h not in there]
            if beyond:
                middle = (hit.distance + beyond[0]) / 2
                on_the_way = (u + middle * du, v + middle * dv)
                if self._holds(on_the_way) and not self._on_edge(on_the_way, hit):
                    continue
            return min(there, key=lambda h: h.edge in self.supported)
        # Off the outline by less than counts, and leaving.
        return Hit(0.0, self._nearest((u, v)).edge)

    def _on_edge(self, point: Point, hit: Hit) -> bool:
        """Whether a ray that has met the outline runs on along an edge: no plate lies beside it."""
        return hit.distance > _SAME and self._nearest(point).distance < _SAME

    def _nearest(self, point: Point) -> Hit:
        """The edge nearest to a point."""
        apart = [_apart(point, *self.edge(i)) for i in range(len(self.outline))]
        return Hit(min(apart), apart.index(min(apart)))

    def _holds(self, point: Point) -> bool:
        """Whether a point is on the gusset, its edges included."""
        return _inside(self.outline, point) or self._nearest(point).distance < _SAME

    def _what(self, edge: int) -> str:
        return "support" if edge in self.supported else "free edge"

    def width(self, starts: Sequence[Point], u_last: float) -> Width:
        """The width at u = `u_last` over which the force spreads at 30 degrees from `starts`.

        It counts no farther than the outline does on the line across, nor than the least that the
        outline leaves of the spread on its way there; a supported edge cuts it as a free one does.

        Raises
        ------
        InputError
            Where there is no plate in the middle of the line across, or none that the force
            reaches straight from where it starts.
        """
        low, high = _bounds(starts, u_last)
        middle = min(max(0.0, low), high)
        ends, cuts = [], []
        for sign, limit in ((-1.0, low), (1.0, high)):
            start = max(starts, key=lambda at: sign * at[1] + (at[0] - u_last) * _TAN_30)
            line = self.ray(u_last, middle, 0.0, sign)
            found = [(middle + sign * line.distance, line.edge)]
            for i in range(len(self.outline)):
                depth = _least_depth(*self.edge(i), start, (u_last, middle), sign)
                if depth is not None:
                    found.append((start[1] + sign * depth, i))
            at, edge = min(found, key=lambda each: sign * each[0])
            cut = sign * at < sign * limit - _TINY
            ends.append(at if cut else limit)
            cuts.append(self._what(edge) if cut else "")
        if any(cuts) and ends[1] - ends[0] < _SAME:
            raise InputError(
                f"gusset: its outline leaves no width for the force at u = {u_last:g} mm; plate is"
                " due all the way along the joint"
            )
        return Width(ends[0], ends[1], cuts[0], cuts[1])

    def strips(
        self, u_last: float, width: Width
    ) -> tuple[float | None, float | None, float | None]:
        """Along the member back to the support from the low end, the middle and the high end of
        the width; None where a free edge comes first."""
        ends = (width.low, (width.low + width.high) / 2, width.high)
        hits = [self.ray(u_last, v, -1.0, 0.0) for v in ends]
        first, second, third = (
            hit.distance if hit.edge in self.supported else None for hit in hits
        )
        return first, second, third

    def free_edges(self) -> list[tuple[int, float]]:
        """Each edge that is not supported, with its length; edges that go straight on from one
        another are one, under the number of the first."""
        n = len(self.outline)
        free = [i for i in range(n) if i not in self.supported]
        found: dict[int, float] = {}
        for i in free:
            first = i
            while (before := (first - 1) % n) in free and before != i:
                if not self._straight(before, first):
                    break
                first = before
            found[first] = found.get(first, 0.0) + math.dist(*self.edge(i))
        return list(found.items())

    def _straight(self, i: int, j: int) -> bool:
        """Whether edge j goes straight on from edge i."""
        (start, corner), (_, end) = self.edge(i), self.edge(j)
        return _apart(corner, start, end) < _SAME

    def edge_distance(self, u: float, v: float) -> float:
        """From a point square to the nearest free edge, which may lie askew to the force; infinite
        where no edge is free."""
        free = [i for i in range(len(self.outline)) if i not in self.supported]
        return min((_apart((u, v), *self.edge(i)) for i in free), default=math.inf)

    def support_runs(self) -> list[SupportRun]:
        """Each supported edge and what a unit tension along +u on v = 0 puts on it."""
        out = []
        for i in self.supported:
            (a, b), (c, d) = self.edge(i)
            length = math.hypot(c - a, d - b)
            eu, ev = (c - a) / length, (d - b) / length
            # Moment of the force about the edge's middle; the lever turns it into the square part.
            moment = (b + d) / 2
            square = abs(ev)
            out.append(SupportRun(i, length, abs(eu), square, abs(moment)))
        return out

    @cached_property
    def across(self) -> tuple[float, float]:
        """Extent of the outline across the force."""
        vs = [v for _, v in self.outline]
        return min(vs), max(vs)


@dataclass(frozen=True)
class GussetPart:
    """A gusset as the search for failure paths sees it: x from `u_0` back into the gusset, y across
    from its lowest point; its own edges all round. `u_0` is any u beyond its free end."""

    shape: GussetShape
    t: float
    u_0: float

    def to_part(self, u: float, v: float) -> Point:
        """A point of the end in the part's axes."""
        return self.u_0 - u, v - self.shape.across[0]

    def _end(self, x: float, y: float) -> Point:
        return self.u_0 - x, y + self.shape.across[0]

    @property
    def width(self) -> float:
        low, high = self.shape.across
        return high - low

    def thickness(self, y: float) -> float:
        return self.t

    def thickness_between(self, y_1: float, y_2: float) -> float:
        return self.t

    def _to(self, x: float, y: float, du: float, dv: float) -> float:
        hit = self.shape.ray(*self._end(x, y), du, dv)
        return math.inf if hit.edge in self.shape.supported else hit.distance

    def edge_distance(self, x: float, y: float) -> float:
        """Square to the nearest free edge, which may lie askew to the force."""
        return self.shape.edge_distance(*self._end(x, y))

    def to_end(self, x: float, y: float) -> float:
        return self._to(x, y, 1.0, 0.0)

    def to_low(self, x: float, y: float) -> float:
        return self._to(x, y, 0.0, -1.0)

    def to_high(self, x: float, y: float) -> float:
        return self._to(x, y, 0.0, 1.0)


def _bounds(starts: Sequence[Point], u_last: float) -> Point:
    low = min(v - (u - u_last) * _TAN_30 for u, v in starts)
    high = max(v + (u - u_last) * _TAN_30 for u, v in starts)
    return low, high


def _least_depth(a: Point, b: Point, start: Point, middle: Point, sign: float) -> float | None:
    """How near to the line along the force through `start` an edge comes inside the spread on the
    side of `sign`, from `start` to the line across through `middle`; None where it stays outside.

    The spread lies between its ray and that line along the force; where the middle lies farther
    out, between its ray and the way to the middle.
    """
    # Coordinates in the spread: s back from the start, w out to the side; it is where
    # inner · s < w < s tan 30 and s < reach. What only touches it is outside.
    reach = start[0] - middle[0]
    if reach < _SAME:
        return None
    inner = max(sign * (middle[1] - start[1]) / reach, 0.0)
    (s_1, w_1), (s_2, w_2) = ((start[0] - u, sign * (v - start[1])) for u, v in (a, b))
    begin, finish = 0.0, 1.0
    for at_1, at_2 in (
        (w_1 - inner * s_1, w_2 - inner * s_2),
        (s_1 * _TAN_30 - w_1 - _SAME, s_2 * _TAN_30 - w_2 - _SAME),
        (reach - s_1 - _SAME, reach - s_2 - _SAME),
    ):
        if at_1 < 0.0 and at_2 < 0.0:
            return None
        if at_1 < 0.0 or at_2 < 0.0:
            share = at_1 / (at_1 - at_2)
            begin, finish = (max(begin, share), finish) if at_1 < 0 else (begin, min(finish, share))
    if begin >= finish:
        return None
    return max(min(w_1 + k * (w_2 - w_1) for k in (begin, finish)), 0.0)


def _inside(polygon: Sequence[Point], point: Point) -> bool:
    x, y = point
    inside = False
    for (a, b), (c, d) in zip(polygon, [*polygon[1:], polygon[0]], strict=True):
        if (b > y) != (d > y) and x < a + (y - b) * (c - a) / (d - b):
            inside = not inside
    return inside


def _apart(point: Point, a: Point, b: Point) -> float:
    """Distance of a point from the segment ab."""
    du, dv = b[0] - a[0], b[1] - a[1]
    k = ((point[0] - a[0]) * du + (point[1] - a[1]) * dv) / (du * du + dv * dv)
    k = min(max(k, 0.0), 1.0)
    return math.hypot(a[0] + k * du - point[0], a[1] + k * dv - point[1])


def _check_outline(corners: Sequence[Point]) -> None:
    """Refuse a corner that stands twice, and edges that cross, touch or fold back."""
    n = len(corners)
    for i in range(n):
        for j in range(i + 1, n):
            if math.dist(corners[i], corners[j]) < _SAME:
                raise InputError(
                    f"corners: corner {j} is the same point as corner {i}; give each corner once"
                )
    edges = [(corners[i], corners[(i + 1) % n]) for i in range(n)]
    for i in range(n):
        for j in range(i + 1, n):
            if _meet(edges[i], edges[j]):
                raise InputError(
                    f"corners: two edges cross or touch, edges {i} and {j}; give the corners in"
                    " turn round the outline"
                )


def _meet(one: tuple[Point, Point], other: tuple[Point, Point]) -> bool:
    """Whether two segments meet elsewhere than in a corner they share."""

    def side(a: Point, b: Point, c: Point) -> float:
        return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0])

    free = [(p, *other) for p in one if p not in other] + [(p, *one) for p in other if p not in one]
    if any(_apart(*each) < _SAME for each in free):
        return True
    (p, q), (r, s) = one, other
    return side(p, q, r) * side(p, q, s) < 0 and side(r, s, p) * side(r, s, q) < 0
