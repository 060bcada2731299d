"""What NZS 3404:Part 1:1997 answers where it and AS 4100 part."""

from __future__ import annotations

from tensionlib.standards.common_as_nzs.rules import NOT_CHECKED, BlockRule, Factors, Rules
from tensionlib.standards.nzs3404.bearing import bearing
from tensionlib.standards.nzs3404.overstrength import overstrength

# Table 3.3(1), read in a printed page of the table; slip from Table 3.3(2).
FACTORS = Factors(
    clause="Table 3.3(1)",
    member=0.90,
    component=0.90,
    bolt=0.80,
    pin=0.80,
    ply=0.90,
    slip=0.70,
    fillet={"SP": 0.80, "GP": 0.60},
)

BLOCK = BlockRule(
    clause="practice",
    phi=0.75,
    known="common practice; form of AS 4100:2020 9.1.9, from memory, fairly sure",
    note="Block shear: NZS 3404:1997 as remembered has no rule of its own; the form and the factor"
    " of AS 4100:2020 9.1.9 are used, from memory.",
)

RULES = Rules(
    name="NZS 3404",
    factors=FACTORS,
    k_t="k_te",
    slip_clause="Table 3.3(2)",
    bearing=bearing,
    overstrength=overstrength,
    class_10_9=None,
    block=BLOCK,
    not_checked=NOT_CHECKED,
)
