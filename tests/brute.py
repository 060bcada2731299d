"""Every net-section chain and every tear-out surface of a pattern, tried one by one.

What the searches of `tensionlib.joints` are compared with: plain Python, its own arithmetic.
A surface is taken as a choice of lines of holes that it meets, for each of them the hole where
the tension from below arrives and the one where that to above leaves, and for each gap whether
there is tension or the surface is free. Areas and the bolts taken along are counted from the
drawn surface. Which holes form a line is asked of the library.
"""

from __future__ import annotations

import itertools
import math

from tensionlib.joints.blocks import lines_of


def chains(holes):
    """Every chain: subsets in rising y, no two of one y."""
    ordered = sorted(holes, key=lambda h: h.y)

    def grow(chain, rest):
        for i, hole in enumerate(rest):
            if not chain or hole.y > chain[-1].y + 1e-6:
                longer = [*chain, hole]
                yield longer
                yield from grow(longer, rest[i + 1 :])

    yield from grow([], ordered)


def area_lost(part, chain) -> float:
    area = 0.0
    for i, hole in enumerate(chain):
        area += hole.across * part.thickness(hole.y)
        if i:
            before = chain[i - 1]
            s, g = abs(hole.x - before.x), hole.y - before.y
            if s > 1e-9:
                area -= s**2 / (4 * g) * part.thickness_between(before.y, hole.y)
    return area


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


def least_surface(part, holes, forms, *, whole, edges):
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
