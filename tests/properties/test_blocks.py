"""The block search against every failure surface of random patterns, tried one by one.

The brute force, `tests/brute.py`, is written apart.
"""

from __future__ import annotations

import math

from hypothesis import given, settings
from hypothesis import strategies as st

from tensionlib.joints.blocks import Form, least_block
from tensionlib.joints.parts import Flat, Opening
from tests.brute import least_surface

# The forms of AS 4100, and forms that count every area, as other standards do.
FORMS = (
    (Form(0.0, 0.6 * 440.0, 0.0, 440.0), Form(0.6 * 320.0, 0.0, 0.0, 440.0)),
    (Form(185.0, 0.0, 0.0, 360.0), Form(0.0, 230.0, 320.0, 0.0)),
    (Form(90.0, 70.0, 50.0, 300.0),),
)


@st.composite
def patterns(draw):
    part = Flat.plain(200.0, 10.0, low_free=draw(st.booleans()), high_free=draw(st.booleans()))
    grid = draw(st.sampled_from((5, 35)))
    holes = []
    for i in range(draw(st.integers(1, 5))):
        x = 35.0 + grid * draw(st.integers(0, 175 // grid))
        y = 30.0 + grid * draw(st.integers(0, 140 // grid))
        d = float(draw(st.sampled_from((18, 21, 22, 27))))
        if any(math.hypot(h.x - x, h.y - y) <= (h.across + d) / 2 for h in holes):
            continue
        along = draw(st.sampled_from((d, d, 30.0)))
        holes.append(Opening(str(i), x, y, d, along, draw(st.integers(0, 4)) > 0))
    return part, holes


@settings(max_examples=5000, deadline=None, derandomize=True)
@given(patterns(), st.sampled_from(FORMS), st.booleans(), st.booleans())
def test_the_least_block_is_the_least_of_all(pattern, forms, whole, edges):
    part, holes = pattern
    found = least_block(part, holes, forms, whole_group_only=whole, edge_to_edge=edges)
    best = least_surface(part, holes, forms, whole=whole, edges=edges)
    if found is None:
        assert best == math.inf
        return
    assert math.isclose(found.capacity(forms) / found.share, best, rel_tol=1e-9)
    assert math.isclose(found.share, len(found.separated) / sum(h.bolt for h in holes))
