"""Published design capacities of 8.8/S bolts in shear and in tension.

Source: Design Capacity Tables for Structural Steel, vol. 1, 3rd edition, Australian Institute of
Steel Construction / Australian Steel Institute; the same values stand in the Steel Designers'
Handbook of Gorenc, Tinyou and Syam, 7th and 8th editions. Bolts of strength 8.8, snug tight, one
shear plane, threads in it (N) or out of it (X), factor 0.80, in kN. AS 4100 9.3.2.1, the cousin of
NZS 3404 9.3.2.1; in tension 9.3.2.2, on the tensile stress area.

Known from: memory of the source.

Tolerance: as printed, half a unit of the last figure.
"""

from __future__ import annotations

import pytest

from tensionlib.standards.common_as_nzs import bolts
from tensionlib.standards.nzs3404.rules import FACTORS
from tensionlib.steel import bolt
from tests.printed import agrees

# Size: kN with threads in the shear plane, kN with threads out of it.
PUBLISHED = {
    "M16": ("59.3", "82.7"),
    "M20": ("92.6", "129"),
    "M24": ("133", "186"),
    "M30": ("214", "291"),
}


def _in_shear(formula, f_uf: float, area: float) -> float:
    return bolts.design_shear(FACTORS.bolt, 1.0, formula(f_uf, 1.0, 1.0, area)) / 1e3


@pytest.mark.parametrize("size", PUBLISHED)
def test_threads_in_the_shear_plane(size):
    b = bolt(f"{size} 8.8/S")
    assert agrees(_in_shear(bolts.shear_threads_in, b.f_uf, b.A_c), PUBLISHED[size][0])


@pytest.mark.parametrize("size", PUBLISHED)
def test_threads_out_of_the_shear_plane(size):
    b = bolt(f"{size} 8.8/S")
    assert agrees(_in_shear(bolts.shear_threads_out, b.f_uf, b.A_o), PUBLISHED[size][1])


@pytest.mark.parametrize("size", PUBLISHED)
def test_the_stress_area_does_not_reproduce_the_table(size):
    """The core area counts, not the tensile stress area: the comparison tells them apart."""
    b = bolt(f"{size} 8.8/S")
    assert not agrees(_in_shear(bolts.shear_threads_in, b.f_uf, b.A_s), PUBLISHED[size][0])


@pytest.mark.parametrize(
    ("size", "printed"), [("M16", "104"), ("M20", "163"), ("M24", "234"), ("M30", "373")]
)
def test_tension(size, printed):
    b = bolt(f"{size} 8.8/S")
    assert agrees(FACTORS.bolt * bolts.bolt_tension(b.A_s, b.f_uf) / 1e3, printed)
