"""The net-section search against every chain of random patterns, tried one by one.

The brute force, `tests/brute.py`, is written apart.
"""

from __future__ import annotations

import math
from dataclasses import replace
from itertools import pairwise

from hypothesis import given, settings
from hypothesis import strategies as st

from tensionlib.joints.parts import Flat, Opening, Strip, opened_angle, opened_channel
from tensionlib.joints.paths import least_path
from tests.brute import area_lost, chains

PARTS = (
    Flat.plain(240.0, 10.0),
    opened_angle(150.0, 100.0, 12.0),
    opened_channel(150.0, 75.0, 9.5, 6.0),
)


def _behind(chain, holes) -> int:
    """Bolts on the body side of the chain drawn as a line from edge to edge."""

    def depth(y):
        if y <= chain[0].y + 1e-6:
            return chain[0].x
        if y >= chain[-1].y - 1e-6:
            return chain[-1].x
        for a, b in pairwise(chain):
            if a.y <= y <= b.y:
                if abs(y - b.y) <= 1e-6:
                    return b.x
                return a.x + (b.x - a.x) * (y - a.y) / (b.y - a.y)
        raise AssertionError

    return sum(h.bolt and h.x > depth(h.y) + 1e-6 for h in holes)


@st.composite
def patterns(draw):
    part = draw(st.sampled_from(PARTS))
    # A coarse grid makes lines and equal staggers likely; the finer ones the rest.
    grid = draw(st.sampled_from((0.37, 1, 5, 35)))
    most = int((part.width - 30) // grid)
    holes = []
    for i in range(draw(st.integers(1, 6) | st.integers(1, 9))):
        x = 30.0 + grid * draw(st.integers(0, int(300 // grid)))
        y = 15.0 + grid * draw(st.integers(0, most))
        if any((h.x, h.y) == (x, y) for h in holes):
            continue
        across = float(draw(st.sampled_from((18, 22, 26, 30))))
        along = draw(st.sampled_from((across, 50.0)))
        holes.append(Opening(str(i), x, y, across, along, draw(st.booleans())))
    return part, holes


def turned(part, holes):
    """The pattern seen from the other edge."""
    width = part.width
    strips = [Strip(s.name, width - s.high, width - s.low, s.t) for s in reversed(part.strips)]
    return Flat(tuple(strips)), [replace(hole, y=width - hole.y) for hole in holes]


@settings(max_examples=3500, deadline=None, derandomize=True)
@given(patterns())
def test_the_least_chain_is_the_least_of_all(pattern):
    part, holes = pattern
    found = least_path(part, holes)
    worst = max(area_lost(part, chain) for chain in chains(holes))
    assert math.isclose(found.lost, worst, rel_tol=1e-9, abs_tol=1e-6)
    assert math.isclose(area_lost(part, [h.hole for h in found.hops]), found.lost, rel_tol=1e-9)


@settings(max_examples=2000, deadline=None, derandomize=True)
@given(patterns(), st.floats(3000.0, 9000.0))
def test_with_credit_the_governing_chain_governs_all(pattern, gross):
    part, holes = pattern
    gross += sum(h.across * 12.0 for h in holes)
    bolts = sum(h.bolt for h in holes)
    found = least_path(part, holes, credit_behind=True, gross=gross)

    def ratio(chain):
        carried = 1.0 if bolts == 0 else 1.0 - _behind(chain, holes) / bolts
        return carried / (gross - area_lost(part, chain))

    worst = max(ratio(chain) for chain in chains(holes))
    assert math.isclose(found.carried / (gross - found.lost), worst, rel_tol=1e-9)
    own = ratio([h.hole for h in found.hops])
    assert math.isclose(own, worst, rel_tol=1e-9)


@settings(max_examples=500, deadline=None, derandomize=True)
@given(patterns(), st.randoms(use_true_random=False))
def test_order_and_side_do_not_matter_and_a_hole_more_never_helps(pattern, rng):
    part, holes = pattern
    lost = least_path(part, holes).lost
    shuffled = list(holes)
    rng.shuffle(shuffled)
    assert least_path(part, shuffled).lost == lost
    assert least_path(part, holes[:-1]).lost <= lost + 1e-9
    assert math.isclose(least_path(*turned(part, holes)).lost, lost, rel_tol=1e-9)


@settings(max_examples=300, deadline=None, derandomize=True)
@given(patterns(), st.randoms(use_true_random=False), st.floats(3000.0, 9000.0))
def test_with_credit_order_and_side_do_not_matter(pattern, rng, gross):
    """A hole more may help: with a bolt in it, it takes a share."""
    part, holes = pattern
    gross += sum(h.across * 12.0 for h in holes)

    def governing(part, holes):
        path = least_path(part, holes, credit_behind=True, gross=gross)
        return path.carried / (gross - path.lost)

    shuffled = list(holes)
    rng.shuffle(shuffled)
    assert governing(part, shuffled) == governing(part, holes)
    assert governing(part, holes) <= (1 + 1e-12) / (gross - least_path(part, holes).lost)
    assert math.isclose(governing(*turned(part, holes)), governing(part, holes), rel_tol=1e-9)
