"""The block search against every failure surface of random patterns, tried one by one.

The brute force is written apart. It takes a surface as a depth for each gap between neighbouring
lines of holes and beyond the outer ones: for every line the hole where the tension of the gap
below meets it and the hole where that of the gap above leaves it, or "free". All areas and all
bolts taken along are then counted from the drawn surface, not from the pass.
"""

from __future__ import annotations

import itertools
import math

from hypothesis import given, settings
from hypothesis import strategies as st

from tensionlib.joints.blocks import Form, least_block, lines_of
from tensionlib.joints.parts import Flat, Opening

FORMS = (Form(0.0, 0.6 * 440.0, 0.0, 440.0), Form(0.6 * 320.0, 0.0, 0.0, 440.0))


def _surfaces(lines, part):
    """Every surface as pieces ("T" | "S", a, b) with None for an edge or the free end.

    A choice of lines that the surface meets, in order; between two lines met, tension or a gap;
    at each line met, a hole where it arrives and one where it leaves.
    """
    n = len(lines)
    for size in range(1, n + 1):
        for met in itertools.combinations(range(n), size):
            spots = [[(a, b) for a in lines[i] for b in lines[i]] for i in met]
            for chosen in itertools.product(*spots):
                for kinds in itertools.product("TF", repeat=size + 1):
                    yield met, chosen, kinds


def _pieces(met, chosen, kinds, lines, part):
    """The surface's pieces, or None for one that is no surface of the model."""
    pieces = []
    last = len(met)
    for k in range(last):
        a, b = chosen[k]
        below, above = kinds[k], kinds[k + 1]
        if below == "F" and above == "F":
            return None
        if below == "T":
            if k == 0:
                if not math.isfinite(part.to_low(a.x, a.y)):
                    return None
                pieces.append(("T", None, a))
            else:
                pieces.append(("T", chosen[k - 1][1], a))
        # Along the line: from where it arrives, or the free end, to where it leaves.
        first, second = (a if below == "T" else None), (b if above == "T" else None)
        if below == "F" and a is not lines[met[k]][0]:
            return None  # no arrival to choose: count the choice once
        if above == "F" and b is not lines[met[k]][0]:
            return None
        if first is not second:
            pieces.append(("S", first, second, met[k]))
        if above == "T" and k == last - 1:
            if not math.isfinite(part.to_high(b.x, b.y)):
                return None
            pieces.append(("T", b, None))
    return pieces


def _areas(pieces, lines, part):
    gv = nv = gt = nt = 0.0
    for piece in pieces:
        if piece[0] == "T":
            _, a, b = piece
            if a is None or b is None:
                one = b if a is None else a
                far = part.to_low(one.x, one.y) if a is None else part.to_high(one.x, one.y)
                gross, net = far, far - one.across / 2
                t = part.thickness(one.y)
            else:
                gross = b.y - a.y
                net = gross - a.across / 2 - b.across / 2 + (b.x - a.x) ** 2 / (4 * gross)
                t = part.thickness_between(a.y, b.y)
            gt += gross * t
            nt += max(net, 0.0) * t
        else:
            _, a, b, line = piece
            ends = [h for h in (a, b) if h is not None]
            deep = max(ends, key=lambda h: h.x)
            near = min(ends, key=lambda h: h.x) if len(ends) == 2 else None
            start = near.x if near is not None else 0.0
            passed = [h for h in lines[line] if start < h.x < deep.x]
            gross = deep.x - start
            net = gross - deep.along / 2 - sum(h.along for h in passed)
            if near is not None:
                net -= near.along / 2
            t = part.thickness(deep.y)
            gv += gross * t
            nv += max(net, 0.0) * t
    return gv, nv, gt, nt


def _taken(met, chosen, kinds, lines):
    """Bolts on the surface or nearer the free end than it."""
    taken = set()
    for i, line in enumerate(lines):
        for hole in line:
            if not hole.bolt:
                continue
            if i in met:
                k = met.index(i)
                a, b = chosen[k]
                depths = ([a.x] if kinds[k] == "T" else []) + ([b.x] if kinds[k + 1] == "T" else [])
                if hole.x <= max(depths):
                    taken.add(hole.mark)
                continue
            below = [k for k, m in enumerate(met) if m < i]
            above = [k for k, m in enumerate(met) if m > i]
            gap = kinds[below[-1] + 1] if below else kinds[0]
            if gap == "F":
                continue
            left = chosen[below[-1]][1] if below else None
            right = chosen[above[0]][0] if above else None
            if left is None:
                depth = right.x
            elif right is None:
                depth = left.x
            else:
                depth = left.x + (right.x - left.x) * (hole.y - left.y) / (right.y - left.y)
            if hole.x < depth - 1e-6:
                taken.add(hole.mark)
    return taken


def _brute(part, holes, forms, *, whole, edges):
    lines = lines_of(holes)
    total = sum(h.bolt for h in holes)
    best = math.inf
    for met, chosen, kinds in _surfaces(lines, part):
        pieces = _pieces(met, chosen, kinds, lines, part)
        if not pieces or {p[0] for p in pieces} != {"T", "S"}:
            continue
        if not edges and "F" not in kinds:
            continue
        taken = len(_taken(met, chosen, kinds, lines))
        if taken == 0 or (whole and taken < total):
            continue
        gv, nv, gt, nt = _areas(pieces, lines, part)
        capacity = min(f.gv * gv + f.nv * nv + f.gt * gt + f.nt * nt for f in forms)
        best = min(best, capacity * total / taken)
    return best


@st.composite
def patterns(draw):
    part = Flat.plain(200.0, 10.0, low_free=draw(st.booleans()), high_free=draw(st.booleans()))
    grid = draw(st.sampled_from((5, 35)))
    holes = []
    for i in range(draw(st.integers(1, 5))):
        x = 35.0 + grid * draw(st.integers(0, 175 // grid))
        y = 30.0 + grid * draw(st.integers(0, 140 // grid))
        d = float(draw(st.sampled_from((18, 22, 26))))
        if any(math.hypot(h.x - x, h.y - y) <= (h.across + d) / 2 for h in holes):
            continue
        along = draw(st.sampled_from((d, d, 30.0)))
        holes.append(Opening(str(i), x, y, d, along, draw(st.integers(0, 4)) > 0))
    return part, holes


@settings(max_examples=5000, deadline=None, derandomize=True)
@given(patterns(), st.booleans(), st.booleans())
def test_the_least_block_is_the_least_of_all(pattern, whole, edges):
    part, holes = pattern
    found = least_block(part, holes, FORMS, whole_group_only=whole, edge_to_edge=edges)
    best = _brute(part, holes, FORMS, whole=whole, edges=edges)
    if found is None:
        assert best == math.inf
        return
    assert math.isclose(found.capacity(FORMS) / found.share, best, rel_tol=1e-9)
    assert math.isclose(found.share, len(found.separated) / sum(h.bolt for h in holes))
