"""Tear-out blocks of a hole pattern, all of them, and the one with the least capacity.

Holes stand in lines along the force; two holes are in one line when they lie less than half
their common size apart across it. Between two lines a failure surface either runs in tension,
from a hole of the one to a hole of the other, or there is none and the material stays with the
body. On a line it runs in shear: from where the tension on one side meets the line to where that
on the other side leaves it, or to the free end. At the outer edges of the part it may run in
tension straight to the edge. So one line to an edge, both lines to one edge, each to its own,
between lines, stepped and staggered blocks are all such surfaces.

A surface takes along the bolts on it and those on its free-end side, and carries their share of
the force, all bolts sharing equally. Tension straight across from edge to edge is the net section,
and a single hole sheared out is its tear-out: both are checked elsewhere and are no blocks.
Lengths in mm, areas in mm², stresses in MPa; the part is in the form of `parts`.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import Literal

import numpy as np
import numpy.typing as npt

from tensionlib.joints.parts import Opening, Part

_TOUCH = 1e-6  # mm
_BETTER = 1.0 - 1e-12

Floats = npt.NDArray[np.float64]
Point = tuple[float, float]


@dataclass(frozen=True, slots=True)
class Form:
    """A form of block shear: stress on gross and net area in shear and in tension, MPa.

    The capacity by a form is the sum of stress times area; a standard's is the least of its forms.
    """

    gv: float
    nv: float
    gt: float
    nt: float


@dataclass(frozen=True, slots=True)
class Piece:
    """A straight piece of a failure surface: gross length, length lost to holes, stagger credit
    s²/4g, and thickness; mm."""

    kind: Literal["shear", "tension"]
    x_1: float
    y_1: float
    x_2: float
    y_2: float
    gross: float
    lost: float
    credit: float
    t: float

    @property
    def net(self) -> float:
        """Net length, never less than nothing."""
        return max(self.gross - self.lost + self.credit, 0.0)


@dataclass(frozen=True, slots=True)
class Block:
    """A tear-out block: its surface, the holes on it, the bolts it takes along, their share."""

    pieces: tuple[Piece, ...]
    marks: tuple[str, ...]
    separated: tuple[str, ...]
    share: float

    def _area(self, kind: str, *, net: bool) -> float:
        return math.fsum((p.net if net else p.gross) * p.t for p in self.pieces if p.kind == kind)

    @property
    def A_gv(self) -> float:
        """Gross area in shear."""
        return self._area("shear", net=False)

    @property
    def A_nv(self) -> float:
        """Net area in shear."""
        return self._area("shear", net=True)

    @property
    def A_gt(self) -> float:
        """Gross area in tension."""
        return self._area("tension", net=False)

    @property
    def A_nt(self) -> float:
        """Net area in tension."""
        return self._area("tension", net=True)

    def outlines(self, part: Part) -> tuple[tuple[Point, ...], ...]:
        """What is torn out, as polygons in the part's axes; one where the surface is in one
        piece."""
        found: list[tuple[Point, ...]] = []
        points: list[Point] = []

        def close() -> None:
            if len(points) > 2:
                found.append(tuple(points))
            points.clear()

        for i, piece in enumerate(self.pieces):
            first, last = (piece.x_1, piece.y_1), (piece.x_2, piece.y_2)
            if points and points[-1] != first:
                close()
            if not points:
                if i == 0 and piece.kind == "tension":
                    # To the low edge: the corner of the free end closes the area.
                    points.append((piece.x_1 - part.to_end(piece.x_2, piece.y_2), piece.y_1))
                points.append(first)
            points.append(last)
        if self.pieces[-1].kind == "tension":
            piece = self.pieces[-1]
            points.append((piece.x_2 - part.to_end(piece.x_1, piece.y_1), piece.y_2))
        close()
        return tuple(found)

    def capacity(self, forms: Sequence[Form]) -> float:
        """Nominal capacity, N: the least of the forms."""
        gv, nv, gt, nt = self.A_gv, self.A_nv, self.A_gt, self.A_nt
        return min(f.gv * gv + f.nv * nv + f.gt * gt + f.nt * nt for f in forms)


def lines_of(holes: Sequence[Opening]) -> list[list[Opening]]:
    """The holes in lines along the force, from low to high, each line from end to body."""
    lines: list[list[Opening]] = []
    for hole in sorted(holes, key=lambda h: (h.y, h.x, h.mark)):
        if lines and any(
            abs(hole.y - other.y) < (hole.across + other.across) / 4 for other in lines[-1]
        ):
            lines[-1].append(hole)
        else:
            lines.append([hole])
    return [sorted(line, key=lambda h: (h.x, h.mark)) for line in lines]


def least_block(
    part: Part,
    holes: Sequence[Opening],
    forms: Sequence[Form],
    *,
    whole_group_only: bool = False,
    edge_to_edge: bool = True,
) -> Block | None:
    """The block with the least capacity over its share of the force, exactly.

    A pass over the lines for each form: coefficients are additive over the pieces of a surface,
    so the least over surfaces of each form is a shortest path in (hole, bolts taken along), and
    the least over the forms of these is the least over surfaces of the least over forms.

    Parameters
    ----------
    part : Part
    holes : sequence of Opening
    forms : sequence of Form
    whole_group_only : bool
        Look only at blocks that take every bolt along.
    edge_to_edge : bool
        Count surfaces in one piece from the low edge to the high edge, net sections with a step
        in shear. Not where the part's two edges stand for one of which only one is near.

    Returns
    -------
    Block or None
        None when no surface takes a bolt along.
    """
    total = sum(hole.bolt for hole in holes)
    if total == 0:
        return None
    search = _Search(part, holes, total)
    best: tuple[float, Block] | None = None
    for form in forms:
        block = search.least(form, whole_group_only, edge_to_edge)
        if block is None:
            continue
        value = block.capacity(forms) / block.share
        if best is None or value < best[0] * _BETTER:
            best = value, block
    return None if best is None else best[1]


Pieces = tuple[Piece, ...]


# Surfaces that began in tension at the low edge and have not sheared, that have, and all others.
_STRAIGHT, _STEPPED, _BROKEN = 0, 1, 2


@dataclass
class _State:
    """Surfaces so far, by what they are (row) and bolts taken along (column): the least cost, and
    the move that gave it."""

    cost: Floats
    move: npt.NDArray[np.int64]
    moves: list[tuple[_State | None, int, int, Pieces]] = field(default_factory=list)

    @classmethod
    def empty(cls, total: int) -> _State:
        return cls(np.full((3, total + 1), np.inf), np.full((3, total + 1), -1, dtype=np.int64))

    def reach(
        self,
        origin: _State,
        pieces: Pieces,
        cost: float,
        bolts: int,
        *,
        rows: tuple[int, ...] = (_STRAIGHT, _STEPPED, _BROKEN),
        breaks: bool = False,
    ) -> None:
        """Take the surfaces of `origin` on by `pieces`, which take `bolts` more along.

        `breaks` says that the surface runs out at the free end here.
        """
        width = self.cost.shape[1] - bolts
        if width <= 0:
            return
        sheared = any(piece.kind == "shear" for piece in pieces)
        for row in rows:
            to = _BROKEN if breaks else _STEPPED if sheared and row == _STRAIGHT else row
            reached = origin.cost[row, :width] + cost
            better = reached < self.cost[to, bolts:] * _BETTER
            if better.any():
                self.cost[to, bolts:][better] = reached[better]
                self.move[to, bolts:][better] = len(self.moves)
                self.moves.append((origin, row, bolts, pieces))

    def traced(self, row: int, column: int) -> Pieces:
        """The pieces of the surface that ends here."""
        found: list[Pieces] = []
        state: _State | None = self
        while state is not None and state.move[row, column] >= 0:
            state, row, bolts, pieces = state.moves[int(state.move[row, column])]
            column -= bolts
            found.append(pieces)
        return tuple(piece for pieces in reversed(found) for piece in pieces)


class _Search:
    def __init__(self, part: Part, holes: Sequence[Opening], total: int) -> None:
        self.part, self.total = part, total
        self.holes = tuple(holes)
        self.lines = lines_of(holes)
        self._shears: dict[tuple[int, int, int], Pieces] = {}

    # Pieces -------------------------------------------------------------------------------

    def _tension(self, a: Opening, b: Opening) -> Piece:
        g, s = b.y - a.y, abs(b.x - a.x)
        t = self.part.thickness_between(a.y, b.y)
        return Piece(
            "tension", a.x, a.y, b.x, b.y, g, (a.across + b.across) / 2, s * s / (4 * g), t
        )

    def _to_edge(self, a: Opening, *, low: bool) -> Piece | None:
        far = self.part.to_low(a.x, a.y) if low else self.part.to_high(a.x, a.y)
        if not math.isfinite(far):
            return None
        edge = a.y - far if low else a.y + far
        t = self.part.thickness_between(a.y, edge)
        ends = (edge, a.y) if low else (a.y, edge)
        return Piece("tension", a.x, ends[0], a.x, ends[1], far, a.across / 2, 0.0, t)

    def _shear(self, line: int, a: int, b: int) -> Pieces:
        """Along a line between two of its holes, by index; -1 stands for the free end."""
        if a == b:
            return ()
        key = (line, a, b)
        if key not in self._shears:
            self._shears[key] = (self._sheared(self.lines[line], a, b),)
        return self._shears[key]

    def _sheared(self, line: list[Opening], a: int, b: int) -> Piece:
        low, high = min(a, b), max(a, b)
        hole = line[high]
        lost = hole.along / 2 + sum(other.along for other in line[low + 1 : high])
        if low < 0:
            gross = self.part.to_end(hole.x, hole.y)
            start, t = (hole.x - gross, hole.y), self.part.thickness(hole.y)
        else:
            other = line[low]
            gross, lost = hole.x - other.x, lost + other.along / 2
            start = (other.x, other.y)
            t = min(self.part.thickness(hole.y), self.part.thickness(other.y))
        end = (hole.x, hole.y)
        first, last = (start, end) if a < b else (end, start)
        return Piece("shear", *first, *last, gross, lost, 0.0, t)

    # Bolts taken along --------------------------------------------------------------------

    def _on_line(self, line: int, depth: int) -> int:
        """Bolts of a line up to one of its holes."""
        return sum(hole.bolt for hole in self.lines[line][: depth + 1])

    def _between(self, first: int, a: Opening | None, last: int, b: Opening | None) -> int:
        """Bolts of the lines strictly between two lines, on the free-end side of the tension from
        hole a to hole b; None stands for the part's edge, to which tension runs straight."""
        count = 0
        for line in self.lines[first + 1 : last]:
            for hole in line:
                if a is None or b is None:
                    one = a or b
                    assert one is not None
                    depth = one.x
                else:
                    depth = a.x + (b.x - a.x) * (hole.y - a.y) / (b.y - a.y)
                count += hole.bolt and hole.x < depth - _TOUCH
        return count

    # The pass -----------------------------------------------------------------------------

    def least(self, form: Form, whole_group_only: bool, edge_to_edge: bool) -> Block | None:
        """The block of least cost over share by one form."""

        def cost(pieces: Pieces) -> float:
            return math.fsum(
                (form.gv * p.gross + form.nv * p.net) * p.t
                if p.kind == "shear"
                else (form.gt * p.gross + form.nt * p.net) * p.t
                for p in pieces
            )

        start = _State.empty(self.total)
        start.cost[_STRAIGHT, 0] = 0.0
        end = _State.empty(self.total)
        free = _State.empty(self.total)
        free.reach(start, (), 0.0, 0, breaks=True)
        # Straight from edge to edge is the net section, checked elsewhere.
        closing = (_STEPPED, _BROKEN) if edge_to_edge else (_BROKEN,)
        leaving: list[tuple[int, Opening, _State]] = []
        for L, line in enumerate(self.lines):
            arrived = []
            for a in line:
                state = _State.empty(self.total)
                edge = self._to_edge(a, low=True)
                if edge is not None:
                    state.reach(start, (edge,), cost((edge,)), self._between(-1, None, L, a))
                for M, b, origin in leaving:
                    piece = (self._tension(b, a),)
                    state.reach(origin, piece, cost(piece), self._between(M, b, L, a))
                arrived.append(state)
            here = []
            for j, b in enumerate(line):
                state = _State.empty(self.total)
                for i, origin in enumerate(arrived):
                    pieces = self._shear(L, i, j)
                    state.reach(origin, pieces, cost(pieces), self._on_line(L, max(i, j)))
                pieces = self._shear(L, -1, j)
                state.reach(free, pieces, cost(pieces), self._on_line(L, j))
                here.append((L, b, state))
                edge = self._to_edge(b, low=False)
                if edge is not None:
                    beyond = self._between(L, b, len(self.lines), None)
                    end.reach(state, (edge,), cost((edge,)), beyond, rows=closing, breaks=True)
            # A state of its own for each line: moves point back at states that change no more.
            freed = _State.empty(self.total)
            freed.reach(free, (), 0.0, 0)
            for i, origin in enumerate(arrived):
                pieces = self._shear(L, i, -1)
                freed.reach(origin, pieces, cost(pieces), self._on_line(L, i), breaks=True)
            free = freed
            leaving += here
        end.reach(free, (), 0.0, 0)
        ratios = end.cost[_BROKEN, 1:] * self.total / np.arange(1, self.total + 1)
        if whole_group_only:
            ratios[:-1] = np.inf
        if not np.isfinite(ratios).any():
            return None
        taken = int(np.argmin(ratios)) + 1
        return self._block(end.traced(_BROKEN, taken), taken)

    def _block(self, pieces: Pieces, taken: int) -> Block:
        at = {(hole.x, hole.y): hole.mark for hole in self.holes}
        marks = []
        for piece in pieces:
            for point in ((piece.x_1, piece.y_1), (piece.x_2, piece.y_2)):
                if point in at and at[point] not in marks:
                    marks.append(at[point])
        separated = self._separated(pieces)
        assert len(separated) == taken
        return Block(pieces, tuple(marks), separated, taken / self.total)

    def _separated(self, pieces: Pieces) -> tuple[str, ...]:
        """Marks of the bolts on the surface or on its free-end side."""
        found = []
        for line in self.lines:
            for hole in line:
                if hole.bolt and any(self._takes(p, hole, line) for p in pieces):
                    found.append(hole.mark)
        return tuple(found)

    def _takes(self, piece: Piece, hole: Opening, line: list[Opening]) -> bool:
        ends = ((piece.x_1, piece.y_1), (piece.x_2, piece.y_2))
        own = {(h.x, h.y) for h in line}
        reached = [x for x, y in ends if (x, y) in own]
        if reached:
            return hole.x <= max(reached)
        if piece.kind == "shear" or not min(piece.y_1, piece.y_2) < hole.y < max(
            piece.y_1, piece.y_2
        ):
            return False
        depth = piece.x_1 + (piece.x_2 - piece.x_1) * (hole.y - piece.y_1) / (piece.y_2 - piece.y_1)
        return hole.x < depth - _TOUCH
