"""Fillet welds, AS 4100:1998 and NZS 3404:1997 9.7.3.

From memory; the strength formula and the lap factor agree with AS 4100:1998, whose published
capacities per millimetre the tests reproduce. Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import sqrt
from tensionlib.calculation.formula import Constant, condition, formula
from tensionlib.standards.common_as_nzs.symbols import COMMON

L_1 = Constant("1 m")
L_1700 = Constant("1.7 m")
L_8000 = Constant("8 m")
T_6 = Constant("6 mm")
T_ONE = Constant("1 mm")

# Table 9.7.3.2, from memory, sure: thickest part up to and including (mm), least leg size (mm).
LEAST_LEGS = ((7.0, 3.0), (10.0, 4.0), (15.0, 5.0), (float("inf"), 6.0))


@formula("t_t", COMMON, title="design throat", clause="9.7.3.4")
def throat(t_w: Any) -> Any:
    """Design throat of an equal-leg fillet weld [length]. 9.7.3.4."""
    return t_w / sqrt(2)


@formula("l_w", COMMON, title="total length of weld", clause="9.7.3.5")
def length_two_runs(n_e: Any, l_1: Any, l_2: Any) -> Any:
    """Two runs along the force on each connected element [length]. 9.7.3.5."""
    return n_e * (l_1 + l_2)


@formula("l_w", COMMON, title="total length of weld", clause="9.7.3.5")
def length_three_runs(n_e: Any, l_1: Any, l_2: Any, l_t: Any) -> Any:
    """Two runs along the force and one across the end, on each element [length]. 9.7.3.5."""
    return n_e * (l_1 + l_2 + l_t)


@formula("l_w", COMMON, title="total length of weld, four runs", clause="9.7.3.5")
def length_four_runs(l_1: Any, l_2: Any) -> Any:
    """Two runs on each face of the gusset, for a slotted tube or a bar in a slot [length]."""
    return 2 * (l_1 + l_2)


@condition(COMMON, title="is the lap short", clause="Table 9.7.3.10(2)")
def short_lap(l_max: Any) -> Any:
    return l_max <= L_1700


@condition(COMMON, title="is the lap of middle length", clause="Table 9.7.3.10(2)")
def middle_lap(l_max: Any) -> Any:
    return l_max <= L_8000


@formula("k_r", COMMON, title="reduction for the long lap", clause="Table 9.7.3.10(2)")
def long_lap_factor(l_max: Any) -> Any:
    """Reduction factor of a welded lap of 1.7 m to 8 m [factor]. Table 9.7.3.10(2)."""
    return 1.10 - 0.06 * l_max / L_1


@formula("v_w", COMMON, title="capacity of the weld per unit length", clause="9.7.3.10")
def fillet(f_uw: Any, t_t: Any, k_r: Any) -> Any:
    """Nominal capacity of a fillet weld per unit length [force per length]. 9.7.3.10."""
    return 0.6 * f_uw * t_t * k_r


@formula("phiV_w", COMMON, title="design capacity of the welds", clause="9.7.3.10")
def design_fillet(phi: Any, v_w: Any, l_w: Any) -> Any:
    """Design capacity of the whole weld, every run at the same strength [force]. 9.7.3.10."""
    return phi * v_w * l_w


@formula("l_4", COMMON, title="four leg sizes", clause="9.7.3.5")
def least_length(t_w: Any) -> Any:
    """Least length of a fillet weld at full leg size [length]. 9.7.3.5."""
    return 4 * t_w


@condition(COMMON, title="is the edge thinner than 6 mm", clause="9.7.3.3")
def thin_edge(t: Any) -> Any:
    return t < T_6


@formula("t_wmax", COMMON, title="greatest leg along the edge", clause="9.7.3.3")
def leg_limit_thin(t: Any) -> Any:
    """Greatest leg along the edge of an element thinner than 6 mm [length]. 9.7.3.3."""
    return t


@formula("t_wmax", COMMON, title="greatest leg along the edge", clause="9.7.3.3")
def leg_limit(t: Any) -> Any:
    """Greatest leg along the edge of an element of 6 mm or more [length]. 9.7.3.3."""
    return t - T_ONE
