"""The outline of a section, and its properties in closed form.

An outline is made of loops: polygons whose corners may be rounded, and circles. Area, centroid
and second moments come from the straight edges by the boundary integrals of a polygon and from
each rounded corner by the closed forms of a circular segment, so fillets and toe radii count.
All lengths in mm.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Corner:
    """A corner of a polygon, rounded by radius `r` (0: sharp)."""

    x: float
    y: float
    r: float = 0.0


@dataclass(frozen=True, slots=True)
class Arc:
    """The rounding of a corner: tangent points, centre, and signed sweep (rad, left is plus)."""

    x1: float
    y1: float
    x2: float
    y2: float
    cx: float
    cy: float
    r: float
    sweep: float


@dataclass(frozen=True, slots=True)
class Circle:
    """A whole circle."""

    cx: float
    cy: float
    r: float


Loop = tuple[Corner, ...] | Circle


@dataclass(frozen=True, slots=True)
class Moments:
    """Area (mm²), first moments (mm³) and second moments (mm⁴) about the outline's own axes."""

    A: float
    S_x: float
    S_y: float
    I_x: float
    I_y: float
    I_xy: float


# The fields of Moments in order, for one edge or one loop.
_Parts = tuple[float, float, float, float, float, float]


@dataclass(frozen=True, slots=True)
class Outline:
    """The outer loop, anticlockwise, and the holes in it."""

    outer: Loop
    holes: tuple[Loop, ...] = ()

    def moments(self) -> Moments:
        """Area and moments, holes taken off."""
        parts = _parts(self.outer)
        for hole in self.holes:
            parts += [_times(part, -1.0) for part in _parts(hole)]
        # fsum rounds once, so the order of the edges does not show in the last digit.
        return Moments(*map(math.fsum, zip(*parts, strict=True)))


@dataclass(frozen=True, slots=True)
class Properties:
    """Properties about the centroid: mm, mm², mm⁴."""

    A: float
    x_c: float
    y_c: float
    I_x: float
    I_y: float
    I_xy: float

    @classmethod
    def of(cls, m: Moments) -> Properties:
        x, y = m.S_y / m.A, m.S_x / m.A
        return cls(m.A, x, y, m.I_x - m.A * y * y, m.I_y - m.A * x * x, m.I_xy - m.A * x * y)

    @property
    def r_min(self) -> float:
        """Least radius of gyration, about the minor principal axis."""
        middle = (self.I_x + self.I_y) / 2
        reach = math.hypot((self.I_x - self.I_y) / 2, self.I_xy)
        return math.sqrt((middle - reach) / self.A)


def edges(loop: Sequence[Corner]) -> list[Arc | tuple[float, float, float, float]]:
    """The loop as straight edges (x1, y1, x2, y2) and arcs, in order."""
    arcs = [
        _rounding(loop[i - 1], corner, loop[(i + 1) % len(loop)]) for i, corner in enumerate(loop)
    ]
    out: list[Arc | tuple[float, float, float, float]] = []
    for i, arc in enumerate(arcs):
        if arc.r > 0.0:
            out.append(arc)
        after = arcs[(i + 1) % len(arcs)]
        if math.hypot(after.x1 - arc.x2, after.y1 - arc.y2) > 0.0:
            out.append((arc.x2, arc.y2, after.x1, after.y1))
    return out


def _rounding(before: Corner, at: Corner, after: Corner) -> Arc:
    """The arc tangent to both edges of a corner; of no length for a sharp one."""
    if at.r == 0.0:
        return Arc(at.x, at.y, at.x, at.y, at.x, at.y, 0.0, 0.0)
    ux, uy = _unit(at.x - before.x, at.y - before.y)
    vx, vy = _unit(after.x - at.x, after.y - at.y)
    turn = math.atan2(ux * vy - uy * vx, ux * vx + uy * vy)
    back = at.r * math.tan(abs(turn) / 2)
    side = math.copysign(at.r, turn)
    x1, y1 = at.x - back * ux, at.y - back * uy
    return Arc(
        x1,
        y1,
        at.x + back * vx,
        at.y + back * vy,
        x1 - side * uy,
        y1 + side * ux,
        at.r,
        turn,
    )


def _unit(x: float, y: float) -> tuple[float, float]:
    length = math.hypot(x, y)
    return x / length, y / length


def _parts(loop: Loop) -> list[_Parts]:
    """What each edge of a loop adds to the moments."""
    if isinstance(loop, Circle):
        A = math.pi * loop.r**2
        own = A * loop.r**2 / 4
        cx, cy = loop.cx, loop.cy
        return [(A, A * cy, A * cx, own + A * cy**2, own + A * cx**2, A * cx * cy)]
    parts = []
    for edge in edges(loop):
        if isinstance(edge, Arc):
            parts += [_chord(edge.x1, edge.y1, edge.x2, edge.y2), _segment(edge)]
        else:
            parts.append(_chord(*edge))
    return parts


def _times(parts: _Parts, factor: float) -> _Parts:
    A, S_x, S_y, I_x, I_y, I_xy = parts
    return (factor * A, factor * S_x, factor * S_y, factor * I_x, factor * I_y, factor * I_xy)


def _chord(x1: float, y1: float, x2: float, y2: float) -> _Parts:
    """What a straight edge adds: the triangle it spans with the origin, signed."""
    cross = x1 * y2 - x2 * y1
    return (
        cross / 2,
        cross * (y1 + y2) / 6,
        cross * (x1 + x2) / 6,
        cross * (y1 * y1 + y1 * y2 + y2 * y2) / 12,
        cross * (x1 * x1 + x1 * x2 + x2 * x2) / 12,
        cross * (x1 * y2 + 2 * x1 * y1 + 2 * x2 * y2 + x2 * y1) / 24,
    )


def _segment(arc: Arc) -> _Parts:
    """What an arc adds over its chord: the circular segment, signed by the turn."""
    half, r = abs(arc.sweep) / 2, arc.r
    s, c = math.sin(half), math.cos(half)
    A = r**2 * (half - s * c)
    first = 2 / 3 * r**3 * s**3
    along = r**4 / 4 * (half - s * c + 2 * s**3 * c)
    across = r**4 / 12 * (3 * half - 3 * s * c - 2 * s**3 * c)
    ux, uy = _unit((arc.x1 + arc.x2) / 2 - arc.cx, (arc.y1 + arc.y2) / 2 - arc.cy)
    about_x = along * uy**2 + across * ux**2
    about_y = along * ux**2 + across * uy**2
    product = (along - across) * ux * uy
    qx, qy = first * ux, first * uy
    cx, cy = arc.cx, arc.cy
    parts = (
        A,
        qy + A * cy,
        qx + A * cx,
        about_x + 2 * cy * qy + A * cy**2,
        about_y + 2 * cx * qx + A * cx**2,
        product + cx * qy + cy * qx + A * cx * cy,
    )
    return _times(parts, math.copysign(1.0, arc.sweep))
