"""The gusset's own outline: where the force spreads in it, and what holds it.

End coordinates: u runs along the member from its end towards its body, v across to the left; the
origin is the member's end on the line of its bolts or the middle of its welds. Lengths in mm,
angles in rad. The rules of spreading, interruption and buckling length are common practice, no
source.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

from tensionlib.errors import InputError
from tensionlib.joints.stated import Length, in_mm
from tensionlib.quantities import ANGLE, LENGTH, Quantity, door

Point = tuple[float, float]
_TAN_30 = math.tan(math.pi / 6)
_TINY = 1e-9


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
    square to the edge and the lever of the square part about the edge's middle."""

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
        In turn round the outline, three or more.
    supported : sequence of int
        Edges held by the beam or column, counted from 0; edge i runs from corner i to the next.
    member_at : (length, length)
        Where the member's end lies on the line of its bolts, or in the middle of its welds.
    angle : angle
        From the x axis to the member's direction, from the gusset towards its body.

    Raises
    ------
    InputError
        For fewer than three corners, edges that cross, a supported edge that is not there, or a
        member whose end is not on the gusset.
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

        corners = tuple(pair(f"corner {i}", each) for i, each in enumerate(self.corners))
        if len(corners) < 3:
            raise InputError(f"corners: got {len(corners)}; three or more are due")
        object.__setattr__(self, "corners", corners)
        object.__setattr__(self, "member_at", pair("member_at", self.member_at))
        object.__setattr__(self, "angle", door("angle", self.angle, ANGLE, example="40 deg"))
        held = tuple(self.supported)
        for edge in held:
            if not isinstance(edge, int) or not 0 <= edge < len(corners):
                raise InputError(
                    f"supported: got {edge!r}; edges are counted 0 to {len(corners) - 1}"
                )
        object.__setattr__(self, "supported", held)
        if _crosses(self.outline):
            raise InputError("corners: two edges cross or touch; give the corners in turn")
        if not _inside(self.outline, (0.0, 0.0)):
            raise InputError("member_at: the member's end is not on the gusset; it lies outside")

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
        """From a point inside, in a direction of unit length, to the outline."""
        best: Hit | None = None
        for i in range(len(self.outline)):
            (a, b), (c, d) = self.edge(i)
            eu, ev = c - a, d - b
            cross = du * ev - dv * eu
            if abs(cross) < _TINY:
                continue
            t = ((a - u) * ev - (b - v) * eu) / cross
            s = ((a - u) * dv - (b - v) * du) / cross
            if t > -_TINY and -_TINY <= s <= 1 + _TINY and (best is None or t < best.distance):
                best = Hit(max(t, 0.0), i)
        if best is None:
            raise InputError(f"gusset: the point ({u:g}, {v:g}) mm is not on it")
        return best

    def _what(self, edge: int) -> str:
        return "support" if edge in self.supported else "free edge"

    def width(self, starts: Sequence[Point], u_last: float) -> Width:
        """The width at u = `u_last` over which the force spreads at 30 degrees from `starts`.

        A spread that runs out through an edge counts no farther than where it leaves, and the
        line across no farther than the outline; a supported edge cuts it as a free one does.
        """
        low, high = _bounds(starts, u_last)
        middle = min(max(0.0, low), high)
        cut_low = cut_high = ""
        for sign in (-1.0, 1.0):
            limit = low if sign < 0 else high
            reaches = [(sign * v + (u - u_last) * _TAN_30, (u, v)) for u, v in starts]
            start = max(reaches)[1]
            hits = [
                (middle + sign * hit.distance, hit.edge)
                for hit in [self.ray(u_last, middle, 0.0, sign)]
            ]
            reach = math.hypot(start[0] - u_last, limit - start[1])
            if reach > _TINY:
                hit = self.ray(*start, (u_last - start[0]) / reach, (limit - start[1]) / reach)
                if hit.distance < reach - _TINY:
                    at = start[1] + (limit - start[1]) * hit.distance / reach
                    hits.append((at, hit.edge))
            for at, edge in hits:
                if sign * at < sign * limit - _TINY:
                    limit = at
                    if sign < 0:
                        cut_low = self._what(edge)
                    else:
                        cut_high = self._what(edge)
            if sign < 0:
                low = limit
            else:
                high = limit
        return Width(low, high, cut_low, cut_high)

    def strips(
        self, u_last: float, width: Width
    ) -> tuple[float | None, float | None, float | None]:
        """Along the member back to the support from the low end, the middle and the high end of
        the width; None where a free edge comes first."""
        ends = (width.low, (width.low + width.high) / 2, width.high)
        # A hair inside, so that an end on the outline sees the gusset and not the edge it is on.
        inset = min(1e-6, width.width / 4)
        places = (ends[0] + inset, ends[1], ends[2] - inset)
        hits = [self.ray(u_last, v, -1.0, 0.0) for v in places]
        first, second, third = (
            hit.distance if hit.edge in self.supported else None for hit in hits
        )
        return first, second, third

    def free_edges(self) -> list[tuple[int, float]]:
        """Each edge that is not supported, with its length."""
        return [
            (i, math.dist(*self.edge(i)))
            for i in range(len(self.outline))
            if i not in self.supported
        ]

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


def _inside(polygon: Sequence[Point], point: Point) -> bool:
    x, y = point
    inside = False
    for (a, b), (c, d) in zip(polygon, [*polygon[1:], polygon[0]], strict=True):
        if (b > y) != (d > y) and x < a + (y - b) * (c - a) / (d - b):
            inside = not inside
    return inside


def _crosses(polygon: Sequence[Point]) -> bool:
    """Whether two edges that are not neighbours meet, or a corner stands twice."""
    n = len(polygon)
    edges = [(polygon[i], polygon[(i + 1) % n]) for i in range(n)]
    if any(math.dist(p, q) < _TINY for p, q in edges):
        return True
    return any(
        _meet(*edges[i], *edges[j]) for i in range(n) for j in range(i + 2, n) if (j + 1) % n != i
    )


def _meet(p: Point, q: Point, r: Point, s: Point) -> bool:
    """Whether the segments pq and rs have a point in common."""

    def side(a: Point, b: Point, c: Point) -> float:
        return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0])

    def on(a: Point, b: Point, c: Point) -> bool:
        return (
            min(a[0], b[0]) - _TINY <= c[0] <= max(a[0], b[0]) + _TINY
            and min(a[1], b[1]) - _TINY <= c[1] <= max(a[1], b[1]) + _TINY
        )

    turns = side(p, q, r), side(p, q, s), side(r, s, p), side(r, s, q)
    if turns[0] * turns[1] < 0 and turns[2] * turns[3] < 0:
        return True
    touching = ((p, q, r), (p, q, s), (r, s, p), (r, s, q))
    return any(
        abs(turn) < _TINY and on(*three) for turn, three in zip(turns, touching, strict=True)
    )
