"""Net-section chains: the way across a part on which the holes leave least of it.

A chain runs from the low edge to the high edge through holes of rising y. It loses each hole's
width across the force on the thickness there, and gains s²t/(4g) for each step between two
holes, s along and g across the force (AS 4100:1998 and NZS 3404:1997 9.1.10, from memory). Where
a step crosses from one thickness into another the thinner counts, the conservative reading.
Lengths in mm, areas in mm².
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
import numpy.typing as npt

from tensionlib.errors import InputError
from tensionlib.joints.parts import Flat, Opening, Part

_SAME = 1e-6  # mm: holes no farther apart across the force stand in one line along it
_STRAIGHT = 1e-9  # mm: a step no longer than this along the force is straight

Floats = npt.NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Hop:
    """One hole of a chain with thickness `t`, and the step that leads to it: `s` along, `g` across
    the force on thickness `t_step`; zeros for the first hole."""

    hole: Opening
    s: float
    g: float
    t_step: float
    t: float

    @property
    def lost(self) -> float:
        """Area of the hole less what its step gains, mm²."""
        gained = self.s * self.s * self.t_step / (4 * self.g) if self.s else 0.0
        return self.hole.across * self.t - gained


@dataclass(frozen=True, slots=True)
class NetPath:
    """A chain, the area it loses, and the share of the joint's force it has to carry."""

    hops: tuple[Hop, ...]
    lost: float
    carried: float = 1.0


def least_path(
    part: Part,
    holes: Sequence[Opening],
    *,
    credit_behind: bool = False,
    gross: float | None = None,
) -> NetPath:
    """The chain that leaves least of the part, exactly.

    Parameters
    ----------
    part : Part
    holes : sequence of Opening
    credit_behind : bool
        Credit a chain with the equal shares of the bolts that lie on its body side (larger x): it
        carries the rest. Bolts on the chain are not credited. The chain that governs is then the
        one with the greatest carried / (gross - lost).
    gross : float
        Gross area, mm²; due with `credit_behind`.

    Raises
    ------
    InputError
        For credit without a gross area, or with one that a chain of holes takes whole.
    """
    if not holes:
        return NetPath((), 0.0)
    ordered = sorted(holes, key=lambda hole: (hole.y, hole.x, hole.mark))
    net = _Net(part, ordered)
    if not credit_behind:
        return net.path(net.heaviest())
    if gross is None:
        raise InputError("gross: missing; crediting the bolts behind a chain needs the gross area")
    return net.credited(gross)


class _Net:
    """Holes in order of y, and what each step between two of them gains."""

    def __init__(self, part: Part, ordered: list[Opening]) -> None:
        self.part, self.holes = part, ordered
        self.n = len(ordered)
        self.x: Floats = np.array([hole.x for hole in ordered])
        self.y: Floats = np.array([hole.y for hole in ordered])
        self.t: Floats = np.array([part.thickness(hole.y) for hole in ordered])
        self.own: Floats = np.array([hole.across for hole in ordered]) * self.t
        s = np.abs(self.x[:, None] - self.x[None, :])
        self.s: Floats = np.where(s > _STRAIGHT, s, 0.0)
        self.g: Floats = self.y[None, :] - self.y[:, None]  # from row to column
        self.t_step = self._steps()
        with np.errstate(divide="ignore", invalid="ignore"):
            gained = self.s**2 * self.t_step / (4 * self.g)
        # What arriving at the column's hole from the row's adds to the chain.
        self.adds: Floats = np.where(self.g > _SAME, self.own[None, :] - gained, -np.inf)

    def _steps(self) -> Floats:
        """Least thickness between every two holes; of a flat part all at once."""
        if isinstance(self.part, Flat):
            return self.part.steps(self.y)
        return np.array(
            [[self.part.thickness_between(a, b) for b in self.y] for a in self.y], dtype=float
        )

    def heaviest(self) -> list[int]:
        """Indices of the chain that loses most; of equals the one with fewer holes, then the one
        nearest the body, where the whole force is."""
        best, count = self.own.copy(), np.ones(self.n)
        before = np.full(self.n, -1)
        for j in range(1, self.n):
            reached = best[:j] + self.adds[:j, j]
            most = reached.max()
            if most > best[j]:
                equal = np.flatnonzero(reached >= most)
                i = int(equal[np.argmin(count[equal])])
                best[j], count[j], before[j] = most, count[i] + 1, i
        ends = np.flatnonzero(best >= best.max())
        at = int(min(ends, key=lambda k: (count[k], -self.x[k], k)))
        chain = [at]
        while before[chain[-1]] >= 0:
            chain.append(int(before[chain[-1]]))
        return chain[::-1]

    def path(self, chain: list[int], carried: float = 1.0) -> NetPath:
        hops, last = [], -1
        for k in chain:
            step = (0.0, 0.0, 0.0)
            if last >= 0:
                s, g, t = self.s[last, k], self.g[last, k], self.t_step[last, k]
                step = (float(s), float(g), float(t))
            hops.append(Hop(self.holes[k], *step, float(self.t[k])))
            last = k
        return NetPath(tuple(hops), sum(hop.lost for hop in hops), carried)

    # Credit for the bolts behind ----------------------------------------------------------

    def credited(self, gross: float) -> NetPath:
        """The chain that governs when the bolts on its body side have taken their shares.

        A pass over (last hole, bolts behind so far): what lies behind a chain is counted piece by
        piece, each piece counting the bolts whose y is above its low end and at most at its high
        end, so that no bolt counts twice.
        """
        n = self.n
        bolts = np.array([hole.bolt for hole in self.holes])
        total = int(bolts.sum())
        if total == 0:
            return self.path(self.heaviest())
        behind = self._behind(bolts)
        low, high = self._outside(bolts)
        taken = np.arange(total + 1)
        best = np.full((n, total + 1), -np.inf)
        before = np.full((n, total + 1), -1)
        for j in range(n):
            best[j, low[j]] = self.own[j]
            if j == 0:
                continue
            at = taken - behind[:j, j, None]  # how many were behind the chain at the hole before
            reached = np.take_along_axis(best[:j], np.maximum(at, 0), axis=1)
            reached = np.where(at >= 0, reached, -np.inf) + self.adds[:j, j, None]
            most, source = reached.max(axis=0), reached.argmax(axis=0)
            better = most > best[j]
            best[j, better], before[j, better] = most[better], source[better]
        if best.max() >= gross:
            raise InputError(
                f"gross: got {gross:g} mm²; more than {best.max():g} mm², what one chain of holes"
                " loses, is due"
            )
        carried = 1.0 - (taken + high[:, None]) / total
        ratio = np.where(np.isfinite(best), carried / (gross - best), -np.inf)
        j, k = (int(place) for place in np.unravel_index(ratio.argmax(), ratio.shape))
        share = float(carried[j, k])
        chain = [j]
        while before[j, k] >= 0:
            i = int(before[j, k])
            j, k = i, k - int(behind[i, j])
            chain.append(i)
        return self.path(chain[::-1], share)

    def _behind(self, bolts: npt.NDArray[np.bool_]) -> npt.NDArray[np.int64]:
        """Bolts behind the step from row to column, y above the row's and up to the column's."""
        out = np.zeros((self.n, self.n), dtype=np.int64)
        up_to = self.g <= _SAME  # the column's hole lies below the row's, or in one line with it
        for i in range(self.n):
            to = np.flatnonzero(self.g[i] > _SAME)
            if not to.size:
                continue
            slope = (self.x[to] - self.x[i]) / self.g[i, to]
            line = self.x[i] + slope[:, None] * self.g[i]
            within = bolts & (self.g[i] > _SAME) & up_to[to] & (self.x > line + _SAME)
            out[i, to] = within.sum(axis=1)
        return out

    def _outside(
        self, bolts: npt.NDArray[np.bool_]
    ) -> tuple[npt.NDArray[np.int64], npt.NDArray[np.int64]]:
        """Bolts behind the straight ends: up to a first hole's y, and above a last hole's y."""
        further = bolts[None, :] & (self.x[None, :] > self.x[:, None] + _SAME)
        low = further & (self.y[None, :] <= self.y[:, None] + _SAME)
        high = further & (self.y[None, :] > self.y[:, None] + _SAME)
        return low.sum(axis=1), high.sum(axis=1)
