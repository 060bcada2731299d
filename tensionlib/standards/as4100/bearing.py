"""Bearing of a ply at a bolt, AS 4100:1998 9.3.2.4, from memory, sure.

Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.formula import formula
from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs.symbols import COMMON


@formula("V_bb", COMMON, title="bearing of the ply at a bolt", clause="9.3.2.4")
def ply_bearing(d_f: Any, t: Any, f_u: Any) -> Any:
    """Nominal bearing capacity of a ply at one bolt [force]. 9.3.2.4."""
    return 3.2 * d_f * t * f_u


def bearing(
    work: Working, end: Inputs, d_f: Entry, t: Entry, f_u: Entry, gives: str, title: str
) -> Entry:
    """The line for the nominal bearing capacity of a ply at one bolt."""
    return work.step(ply_bearing, d_f, t, f_u, gives=gives, title=title)
