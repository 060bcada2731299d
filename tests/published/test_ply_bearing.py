"""Published design capacity of a ply in bearing.

Source: Design Capacity Tables for Structural Steel, vol. 1, 3rd edition, Australian Institute of
Steel Construction / Australian Steel Institute; Steel Designers' Handbook of Gorenc, Tinyou and
Syam, 7th and 8th editions. M20 bolt, ply of 10 mm, far from an edge, factor 0.90, in kN. AS 4100
9.3.2.4, and NZS 3404 9.3.2.4 without earthquake.

Known from: memory of the source.

Tolerance: as printed, half a unit of the last figure.
"""

from __future__ import annotations

import pytest

from tensionlib.standards.as4100.bearing import ply_bearing
from tensionlib.standards.common_as_nzs import bolts
from tensionlib.standards.nzs3404 import bearing
from tensionlib.standards.nzs3404.rules import FACTORS
from tests.printed import agrees


@pytest.mark.parametrize(("f_up", "published"), [(440.0, "253"), (410.0, "236")])
def test_bearing_of_a_10_mm_ply_on_an_m20_bolt(f_up, published):
    V_b = bearing.ply_bearing(bearing.FACTOR, 20.0, 10.0, f_up)
    one = bolts.design_ply(FACTORS.ply, 1.0, 1.0, 1.0, V_b)
    assert agrees(one / 1e3, published)
    # AS 4100 writes its 3.2 into the formula.
    assert ply_bearing(20.0, 10.0, f_up) == V_b
