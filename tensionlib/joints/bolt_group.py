"""Bolts that share a force in their plane: each one's share by statics, and what it tears out.

x runs along the force towards the body of the part, y across it, as in `parts`. A share is the
force on a bolt as a fraction of the whole force, positive along +x and +y; the bolt presses on the
part the other way. Moments are positive from x towards y. Lengths in mm.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass
from typing import TypeVar

from tensionlib.errors import InputError
from tensionlib.joints.parts import Opening, Part

T = TypeVar("T")

_SAME_LINE = 1e-6  # mm: a force this near the centroid acts through it
_TIE = 1e-9  # relative: what rounding alone may put between two equal values


@dataclass(frozen=True, slots=True)
class Share:
    """Force on one bolt: x and y from the group's centroid in mm, along and across the force as
    fractions of the whole force."""

    mark: str
    x: float
    y: float
    along: float
    across: float

    @property
    def size(self) -> float:
        """Resultant as a fraction of the whole force."""
        return math.hypot(self.along, self.across)


@dataclass(frozen=True)
class BoltGroup:
    """Shares of a group of bolts, in the order the bolts came.

    `x_c` and `y_c` are the centroid in the part's axes (mm), `I_p` the sum of the squared
    distances from it (mm²), `e` the moment of a unit force about it: the centroid's y less that
    of the force's line (mm), positive where the force passes on the low side of the centroid.
    """

    shares: tuple[Share, ...]
    x_c: float
    y_c: float
    I_p: float
    e: float


def elastic_shares(bolts: Sequence[Opening], line_y: float | None) -> BoltGroup:
    """Shares of a unit force along +x on the line y = `line_y`, by elastic vectors.

    Equal bolts in rigid plates: along = 1/n - e·y/I_p and across = e·x/I_p, x and y from the
    centroid. With `line_y` None the force acts through the centroid and the shares are equal.
    Openings without a bolt take no part. Statics.

    Raises
    ------
    InputError
        For no bolt, a line that is no finite number, or one bolt off the force's line, which
        cannot carry the moment.
    """
    standing = [b for b in bolts if b.bolt]
    if not standing:
        raise InputError("bolts: none stands in the holes given; at least one is due")
    if line_y is not None and not math.isfinite(line_y):
        raise InputError(f"line_y: got {line_y!r}; a finite number of mm, or None, is due")
    n = len(standing)
    x_c = math.fsum(b.x for b in standing) / n
    y_c = math.fsum(b.y for b in standing) / n
    places = [(b.mark, b.x - x_c, b.y - y_c) for b in standing]
    I_p = math.fsum(x * x + y * y for _, x, y in places)
    e = 0.0 if line_y is None else y_c - line_y
    if abs(e) <= _SAME_LINE:
        e = 0.0
    elif n == 1:
        raise InputError(
            f"bolt {standing[0].mark!r} at y = {y_c:g} mm: one bolt carries no moment and the force"
            f" acts at y = {line_y:g} mm; put it on that line, or give two bolts or more"
        )
    elif I_p == 0.0:
        raise InputError(
            f"bolts: all {n} stand at ({x_c:g}, {y_c:g}) mm; bolts apart from each other are due to"
            " carry a moment"
        )
    turn = e / I_p if e else 0.0
    shares = tuple(Share(mark, x, y, 1.0 / n - turn * y, turn * x) for mark, x, y in places)
    return BoltGroup(shares, x_c, y_c, I_p, e)


def mark_order(mark: str) -> tuple[int, str]:
    """Order of marks in which "2" comes before "10"."""
    return len(mark), mark


def first_of_greatest(items: Iterable[T], value: Callable[[T], float]) -> T:
    """The first item whose value is the greatest; values apart by rounding alone count as equal."""
    rated = [(value(item), item) for item in items]
    least = max(rate for rate, _ in rated) * (1.0 - _TIE)
    return next(item for rate, item in rated if rate >= least)


def most_loaded(group: BoltGroup) -> Share:
    """The bolt with the greatest force; of equals, the one that comes first by its mark."""
    return first_of_greatest(_by_mark(group), lambda share: share.size)


def worst_tear_out(group: BoltGroup, a_e: Mapping[str, float]) -> Share:
    """The bolt with the greatest force for its `a_e`, the length that tears out ahead of it (mm,
    by mark; infinite where nothing does); of equals, the one that comes first by its mark.

    Raises
    ------
    InputError
        For a bolt without a positive a_e.
    """
    for share in group.shares:
        length = a_e.get(share.mark)
        if length is None or not length > 0.0:
            raise InputError(
                f"a_e: {length!r} for bolt {share.mark!r}; a length above 0 mm is due for each bolt"
            )
    return first_of_greatest(_by_mark(group), lambda share: share.size / a_e[share.mark])


def _by_mark(group: BoltGroup) -> list[Share]:
    return sorted(group.shares, key=lambda share: mark_order(share.mark))


# Clear distance ---------------------------------------------------------------------------


def clear_distance(
    part: Part,
    holes: Sequence[Opening],
    bolt: Opening,
    *,
    direction: tuple[float, float] = (-1.0, 0.0),
) -> float:
    """Material ahead of a bolt: from the edge of its hole to the next hole or free edge, mm.

    `direction` is the way the bolt presses on the part, of any length but zero's; towards the
    free end unless given. The distance is the least on any line along `direction` that leaves the
    bolt's hole: how far the hole could be moved that way before it touches another hole, with a
    bolt or without, or a free edge. In line along the force it is the centre distance less half of
    both holes, or the end distance less half the hole. A slot counts with its round ends.
    Infinite where nothing is met, and for a direction of (0, 0): a bolt that presses nowhere.
    Geometry; no clause says how far aside a hole may lie to count, so every touched one does.

    Raises
    ------
    InputError
        For a direction that is not finite, and a hole that overlaps the bolt's or an edge.
    """
    size = math.hypot(*direction)
    if not math.isfinite(size):
        raise InputError(f"direction: got {direction!r}; two finite numbers are due")
    if size == 0.0:
        return math.inf
    u_x, u_y = direction[0] / size, direction[1] / size
    found = [math.inf]
    for toward, distance, half, name in (
        (-u_x, part.to_end(bolt.x, bolt.y), bolt.along / 2, "end"),
        (-u_y, part.to_low(bolt.x, bolt.y), bolt.across / 2, "low edge"),
        (u_y, part.to_high(bolt.x, bolt.y), bolt.across / 2, "high edge"),
    ):
        if distance < half:
            raise InputError(
                f"hole {bolt.mark!r}: its centre is {distance:g} mm from the {name};"
                f" at least {half:g} mm, half the hole, is due"
            )
        if toward > 0.0:
            found.append((distance - half) / toward)
    for hole in holes:
        if hole.mark != bolt.mark:
            found.append(_travel(bolt, hole, u_x, u_y))
    return min(found)


def _travel(bolt: Opening, hole: Opening, u_x: float, u_y: float) -> float:
    """How far one hole moves along (u_x, u_y) until it touches the other.

    As a point moving against both shapes added up: two slots with round ends make a rectangle
    with rounded corners, two round holes a circle.
    """
    r_1, r_2 = min(bolt.along, bolt.across) / 2, min(hole.along, hole.across) / 2
    r = r_1 + r_2
    core_x = (bolt.along + hole.along) / 2 - r
    core_y = (bolt.across + hole.across) / 2 - r
    x, y = hole.x - bolt.x, hole.y - bolt.y
    beyond_x, beyond_y = max(abs(x) - core_x, 0.0), max(abs(y) - core_y, 0.0)
    if math.hypot(beyond_x, beyond_y) < r * (1.0 - _TIE):
        raise InputError(f"holes {bolt.mark!r} and {hole.mark!r} overlap; move one of them")
    found = [
        _to_box(x, y, core_x + r, core_y, u_x, u_y),
        _to_box(x, y, core_x, core_y + r, u_x, u_y),
    ]
    for c_x in (x - core_x, x + core_x):
        for c_y in (y - core_y, y + core_y):
            found.append(_to_circle(c_x, c_y, r, u_x, u_y))
    return max(min(found), 0.0)


def _to_circle(x: float, y: float, r: float, u_x: float, u_y: float) -> float:
    """From the origin along (u_x, u_y) to a circle about (x, y), infinite where it is missed."""
    ahead, aside = x * u_x + y * u_y, x * u_y - y * u_x
    if ahead <= 0.0 or abs(aside) >= r:
        return math.inf
    return ahead - math.sqrt(r * r - aside * aside)


def _to_box(x: float, y: float, half_x: float, half_y: float, u_x: float, u_y: float) -> float:
    """From the origin along (u_x, u_y) to a box about (x, y), infinite where it is missed."""
    enter, leave = 0.0, math.inf
    for middle, half, u in ((x, half_x, u_x), (y, half_y, u_y)):
        if u == 0.0:
            if abs(middle) >= half:
                return math.inf
            continue
        near, far = sorted(((middle - half) / u, (middle + half) / u))
        enter, leave = max(enter, near), min(leave, far)
    return enter if enter < leave else math.inf
