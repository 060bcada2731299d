"""Published design capacities of fillet welds, per millimetre of run.

Source: Design Capacity Tables for Structural Steel, vol. 1, 3rd edition, Australian Institute of
Steel Construction / Australian Steel Institute; Steel Designers' Handbook of Gorenc, Tinyou and
Syam, 7th and 8th editions. Equal-leg fillets, lap factor 1.0, quality SP (factor 0.80) and GP
(0.60), in kN/mm. AS 4100 9.7.3.10, the cousin of NZS 3404 9.7.3.10.

Known from: memory of the source.

Tolerance: as printed, half a unit of the last figure.
"""

from __future__ import annotations

import pytest

from tensionlib.standards.common_as_nzs import welds
from tensionlib.standards.nzs3404.rules import FACTORS
from tensionlib.steel import weld_metal
from tests.printed import agrees

# Quality, weld metal, leg in mm, kN/mm as printed.
PUBLISHED = [
    ("SP", "E48XX", 4.0, "0.652"),
    ("SP", "E48XX", 5.0, "0.815"),
    ("SP", "E48XX", 6.0, "0.978"),
    ("SP", "E48XX", 8.0, "1.30"),
    ("SP", "E48XX", 10.0, "1.63"),
    ("SP", "E48XX", 12.0, "1.96"),
    ("SP", "E41XX", 6.0, "0.835"),
    ("GP", "E48XX", 6.0, "0.733"),
]


@pytest.mark.parametrize(("quality", "metal", "leg", "published"), PUBLISHED)
def test_capacity_of_a_millimetre_of_fillet(quality, metal, leg, published):
    v_w = welds.fillet(weld_metal(metal).f_uw, welds.throat(leg), 1.0)
    one = welds.design_fillet(FACTORS.fillet[quality], v_w, 1.0)
    assert agrees(one / 1e3, published)
