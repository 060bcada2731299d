"""AS 4100, editions 2020 and 1998: tension members and their end connections."""

from __future__ import annotations

from functools import partial

from tensionlib.standards.as4100.notation import AS_1998, AS_2020
from tensionlib.standards.as4100.rules import RULES_1998, RULES_2020
from tensionlib.standards.common_as_nzs.block import block_forms
from tensionlib.standards.common_as_nzs.hole_sizes import hole_size
from tensionlib.standards.common_as_nzs.walk import design
from tensionlib.standards.interface import Standard

EDITION_1998 = Standard(
    key="as4100",
    notation=AS_1998,
    design=partial(design, RULES_1998),
    hole_size=hole_size,
    block_forms=block_forms,
    edition="1998",
)
STANDARD = Standard(
    key="as4100",
    notation=AS_2020,
    design=partial(design, RULES_2020),
    hole_size=hole_size,
    block_forms=block_forms,
    edition="2020",
    others=(EDITION_1998,),
)
