"""NZS 3404:Part 1:1997: tension members and their end connections."""

from __future__ import annotations

from functools import partial

from tensionlib.standards.common_as_nzs.block import block_forms
from tensionlib.standards.common_as_nzs.hole_sizes import hole_size
from tensionlib.standards.common_as_nzs.walk import design
from tensionlib.standards.interface import Standard
from tensionlib.standards.nzs3404.notation import NZS
from tensionlib.standards.nzs3404.rules import RULES

STANDARD = Standard(
    key="nzs3404",
    notation=NZS,
    design=partial(design, RULES),
    hole_size=hole_size,
    block_forms=block_forms,
    edition="1997",
)
