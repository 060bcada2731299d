"""What AS 4100 answers where it and NZS 3404 part, from memory."""

from __future__ import annotations

from dataclasses import replace

from tensionlib.standards.as4100.bearing import bearing
from tensionlib.standards.common_as_nzs.rules import NOT_CHECKED, BlockRule, Factors, Rules

# Table 3.4, from memory, sure; the factor for block shear fairly sure.
FACTORS = Factors(
    clause="Table 3.4",
    member=0.90,
    component=0.90,
    bolt=0.80,
    pin=0.80,
    ply=0.90,
    slip=0.70,
    fillet={"SP": 0.80, "GP": 0.60},
)

BLOCK = BlockRule(
    clause="9.1.9",
    phi=0.75,
    known="Table 3.4 and 9.1.9, from memory, fairly sure",
    note="Block shear: the form and its factor are from memory, fairly sure.",
)

RULES_2020 = Rules(
    name="AS 4100",
    factors=FACTORS,
    k_t="k_t",
    slip_clause="3.5.5",
    bearing=bearing,
    overstrength=None,
    # 9.2.2.1 of 2020, for their lesser ductility: from memory, fairly sure.
    class_10_9=0.83,
    block=BLOCK,
    not_checked=NOT_CHECKED,
)
RULES_1998 = replace(
    RULES_2020,
    class_10_9=None,
    block=replace(
        BLOCK,
        note="Block shear: the clause came with the amendment of 2012; its form and its factor are"
        " from memory, fairly sure.",
    ),
)
