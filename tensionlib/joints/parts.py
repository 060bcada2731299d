"""Parts as the search for failure paths sees them: flat, with holes as points.

Every part is put in one form first. x runs along the force from the part's free end into its
body, so the bolts pull the material towards x = 0; y runs across the force from the low edge
(y = 0) to the high edge (y = width). Lengths in mm.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Protocol

import numpy as np
import numpy.typing as npt

from tensionlib.errors import InputError

_BACKED = 1e6  # mm; finite, so that it may meet a factor of zero


@dataclass(frozen=True, slots=True)
class Opening:
    """A hole: its centre, its size across and along the force, and whether a bolt of the joint
    stands in it. A round hole has both sizes alike; a slot has not."""

    mark: str
    x: float
    y: float
    across: float
    along: float
    bolt: bool = True

    @classmethod
    def round(cls, mark: str, x: float, y: float, d: float, *, bolt: bool = True) -> Opening:
        """A round hole of diameter `d`."""
        return cls(mark, x, y, d, d, bolt)


class Part(Protocol):
    """What a search asks of a part. An edge that is not free is infinitely far."""

    @property
    def width(self) -> float:
        """Low edge to high edge, infinite where the part has no edges."""

    def thickness(self, y: float) -> float:
        """Thickness at y."""

    def thickness_between(self, y_1: float, y_2: float) -> float:
        """Least thickness met on the way from y_1 to y_2."""

    def to_end(self, x: float, y: float) -> float:
        """From a point straight along the force to the free end."""

    def to_low(self, x: float, y: float) -> float:
        """From a point straight across the force to the low edge."""

    def to_high(self, x: float, y: float) -> float:
        """From a point straight across the force to the high edge."""


@dataclass(frozen=True, slots=True)
class Strip:
    """A strip of a part along the force, of one thickness, from `low` to `high` across it."""

    name: str
    low: float
    high: float
    t: float


@dataclass(frozen=True)
class Flat:
    """A leg, web, flange or plate, or several of them opened flat: strips side by side.

    `low_free` and `high_free` tell whether the outer edges are free edges a block can tear to.
    `backs` are places across the force where another plate stands on this one, a web on a flange:
    nothing tears across them, so they count as very thick.
    """

    strips: tuple[Strip, ...]
    low_free: bool = True
    high_free: bool = True
    backs: tuple[float, ...] = ()

    def __post_init__(self) -> None:
        at = 0.0
        for strip in self.strips:
            if strip.low != at or strip.high <= strip.low or strip.t <= 0.0:
                raise InputError(
                    f"strips: {strip.name!r} from {strip.low:g} to {strip.high:g} mm,"
                    f" {strip.t:g} mm thick; strips side by side from {at:g} mm are due"
                )
            at = strip.high
        if not self.strips:
            raise InputError("strips: none; give at least one strip of the part")

    @classmethod
    def plain(
        cls, width: float, t: float, *, low_free: bool = True, high_free: bool = True
    ) -> Flat:
        """One element of one thickness."""
        return cls((Strip("", 0.0, width, t),), low_free, high_free)

    @property
    def width(self) -> float:
        return self.strips[-1].high

    def thickness(self, y: float) -> float:
        """Thickness at y; on a line between two strips the thinner one's."""
        return min(s.t for s in self.strips if s.low <= y <= s.high)

    def thickness_between(self, y_1: float, y_2: float) -> float:
        low, high = min(y_1, y_2), max(y_1, y_2)
        if any(low < back < high for back in self.backs):
            return _BACKED
        return min(s.t for s in self.strips if s.low < high and s.high > low)

    def steps(self, y: npt.NDArray[np.float64]) -> npt.NDArray[np.float64]:
        """`thickness_between` for every two of several places y, shape (n,) to (n, n)."""
        low = np.minimum(y[:, None], y[None, :])
        high = np.maximum(y[:, None], y[None, :])
        out = np.full(low.shape, np.inf)
        for strip in self.strips:
            met = (strip.low < high) & (strip.high > low)
            out[met] = np.minimum(out[met], strip.t)
        for back in self.backs:
            out[(low < back) & (back < high)] = _BACKED
        return out

    def to_end(self, x: float, y: float) -> float:
        return x

    def to_low(self, x: float, y: float) -> float:
        return y if self.low_free else math.inf

    def to_high(self, x: float, y: float) -> float:
        return self.width - y if self.high_free else math.inf


def opened_angle(b_1: float, b_2: float, t: float) -> Flat:
    """An angle opened flat, from the toe of its long leg to the toe of its short leg.

    The width round the heel is b_1 + b_2 - t, so that two lines at g_1 and g_2 from the heel lie
    g_1 + g_2 - t apart, as the standards measure it.
    """
    heel = b_1 - t / 2
    return Flat((Strip("long leg", 0.0, heel, t), Strip("short leg", heel, b_1 + b_2 - t, t)))


def opened_channel(d: float, b_f: float, t_f: float, t_w: float) -> Flat:
    """A channel opened flat along the middle of its plates: flange, web, flange.

    A line at g_f from the back of the channel and a web line at z from the outer face of the
    flange then lie g_f + z - t_w/2 - t_f/2 apart, the angle's rule with each plate's own half
    thickness.
    """
    heel, far = b_f - t_w / 2, b_f - t_w / 2 + d - t_f
    return Flat(
        (
            Strip("flange 1", 0.0, heel, t_f),
            Strip("web", heel, far, t_w),
            Strip("flange 2", far, far + heel, t_f),
        )
    )


def check_holes(part: Part, holes: Sequence[Opening]) -> None:
    """Refuse holes that overlap each other, leave the part, or share a mark.

    Raises
    ------
    InputError
        Naming the hole by its mark, where it lies, and what would be accepted.
    """
    marks: set[str] = set()
    for hole in holes:
        if hole.mark in marks:
            raise InputError(f"holes: the mark {hole.mark!r} stands twice; give each hole its own")
        marks.add(hole.mark)
        where = f"hole {hole.mark!r} at ({hole.x:g}, {hole.y:g}) mm"
        if part.to_end(hole.x, hole.y) <= hole.along / 2:
            raise InputError(f"{where}: it cuts the end of the part; more end distance is due")
        # An edge that is not free still bounds the part.
        if (
            not hole.across / 2 < hole.y < part.width - hole.across / 2
            or min(part.to_low(hole.x, hole.y), part.to_high(hole.x, hole.y)) <= hole.across / 2
        ):
            raise InputError(
                f"{where}: it cuts an edge of the part, which runs from 0 to {part.width:g} mm"
                " across the force"
            )
    for i, a in enumerate(holes):
        for b in holes[i + 1 :]:
            if _overlap(a, b):
                raise InputError(f"holes {a.mark!r} and {b.mark!r} overlap; move one of them")


def _overlap(a: Opening, b: Opening) -> bool:
    """Whether two holes overlap; a slot counts as the ellipse in its box, on the lenient side."""
    across, along = (a.across + b.across) / 2, (a.along + b.along) / 2
    return ((a.x - b.x) / along) ** 2 + ((a.y - b.y) / across) ** 2 <= 1.0
