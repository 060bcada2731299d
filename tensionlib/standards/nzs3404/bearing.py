"""Bearing of a ply at a bolt, NZS 3404:Part 1:1997 9.3.2.4.

The clause writes the bearing factor as the symbol C_1, whose value outside seismic action and thin
plies is 3.2, from memory, fairly sure; the values for those cases are not known to the library and
not covered. Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.formula import formula
from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.nzs3404.notation import NZS

FACTOR = 3.2


@formula("V_bb", NZS, title="bearing of the ply at a bolt", clause="9.3.2.4")
def ply_bearing(C_1: Any, d_f: Any, t: Any, f_u: Any) -> Any:
    """Nominal bearing capacity of a ply at one bolt [force]. 9.3.2.4."""
    return C_1 * d_f * t * f_u


def bearing(
    work: Working, end: Inputs, d_f: Entry, t: Entry, f_u: Entry, gives: str, title: str
) -> Entry:
    """The lines for the nominal bearing capacity of a ply at one bolt."""
    if end.has("C_1"):
        C_1 = end.take(work, "C_1")
    else:
        C_1 = work.fixed(
            "C_1",
            FACTOR,
            "9.3.2.4",
            note="no earthquake action; values for earthquake or thin plies are not covered",
            source="9.3.2.4, from memory, fairly sure",
        )
    if end.choice("earthquake") == "yes" and not end.has("C_1"):
        work.not_covered(
            title + " under earthquake",
            "the ply bearing factor C_1 of a brace that yields is not known to the library: state"
            " it as Overstrength(bearing_factor=...)",
            "9.3.2.4",
        )
    return work.step(ply_bearing, C_1, d_f, t, f_u, gives=gives, title=title)
