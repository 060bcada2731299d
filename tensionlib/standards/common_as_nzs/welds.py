"""Fillet welds, AS 4100:1998 and NZS 3404:1997 9.7.3.

From memory; the strength formula and the lap factor agree with AS 4100:1998, whose published
capacities per millimetre the tests reproduce. Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import sqrt, square
from tensionlib.calculation.formula import Constant, condition, formula
from tensionlib.calculation.symbols import Notation, Symbol
from tensionlib.quantities import AREA, INERTIA, LENGTH, STRESS
from tensionlib.standards.common_as_nzs.symbols import COMMON, SYMBOLS

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


SHORTEST_LAP = 25.0  # mm; AISC 360-16 J2.2b, from memory


@formula(
    "l_5",
    COMMON,
    title="five times the thinner part",
    clause="practice",
    known="AISC 360-16 J2.2b, from memory; advice",
)
def five_plies(t_thin: Any) -> Any:
    """Least lap of two parts by the thinner one [length]. Advice."""
    return 5 * t_thin


# Eccentric groups of fillets, by elastic vectors -----------------------------------------

STATICS = "statics"
WELDS = Notation(
    COMMON.source,
    [
        *SYMBOLS,
        Symbol("A_w", "A_{w}", AREA, "area of all throats, all plies"),
        Symbol("I_w", "I_{w}", INERTIA, "polar second moment of the throats"),
        Symbol("e_w", "e_{w}", LENGTH, "member's line off the weld's centroid"),
        Symbol("x_w", "x_{w}", LENGTH, "most stressed point from the centroid, along the force"),
        Symbol("y_w", "y_{w}", LENGTH, "most stressed point from the centroid, across the force"),
        Symbol("tau_x", r"\tau_{x}", STRESS, "stress on the throat along the member", "τ_x"),
        Symbol("tau_y", r"\tau_{y}", STRESS, "stress on the throat across the member", "τ_y"),
        Symbol("tau_star", r"\tau^{*}", STRESS, "design stress on the throat", "τ*"),
        Symbol("phi_tau", r"\phi \tau_{w}", STRESS, "design strength of the throat", "φτ_w"),
        Symbol("A_wn", "A_{wn}", AREA, "area of all throats of one ply"),
        Symbol("I_wn", "I_{wn}", INERTIA, "polar second moment of one ply's throats"),
        Symbol("x_bar", r"\bar{x}", LENGTH, "centroid of half the tube off the gusset", "x̄"),
        Symbol("h_s", "h_{s}", LENGTH, "height of the tube along the gusset's face"),
    ],
)


@formula("A_w", WELDS, title="area of all throats", known=STATICS)
def throats_of_plies(n_e: Any, A_wn: Any) -> Any:
    """Throat area over all plies [area]. Statics."""
    return n_e * A_wn


@formula("I_w", WELDS, title="polar second moment of all throats", known=STATICS)
def inertia_of_plies(n_e: Any, I_wn: Any) -> Any:
    """Polar second moment of the throats over all plies [inertia]. Statics."""
    return n_e * I_wn


@formula("tau_x", WELDS, title="along the member, direct force and moment", known=STATICS)
def throat_stress_along(N_star_c: Any, A_w: Any, e_w: Any, y_w: Any, I_w: Any) -> Any:
    """Throat stress along the member by elastic vectors [stress]. Statics."""
    return N_star_c / A_w - N_star_c * e_w * y_w / I_w


@formula("tau_y", WELDS, title="across the member, from the moment", known=STATICS)
def throat_stress_across(N_star_c: Any, e_w: Any, x_w: Any, I_w: Any) -> Any:
    """Throat stress across the member by elastic vectors [stress]. Statics."""
    return N_star_c * e_w * x_w / I_w


@formula("tau_star", WELDS, title="resultant on the throat", known=STATICS)
def throat_stress(tau_x: Any, tau_y: Any) -> Any:
    """Resultant stress on the throat [stress]. Statics."""
    return sqrt(square(tau_x) + square(tau_y))


@condition(WELDS, title="are the welds as long as the tube is high", clause="practice")
def as_long_as_tube(l_min: Any, h_s: Any) -> Any:
    return l_min >= h_s


@formula(
    "k_t",
    WELDS,
    title="correction factor by length",
    clause="practice",
    known="AISC 360-16 Table D3.1, cases 5 and 6, from memory",
)
def shear_lag(x_bar: Any, l_min: Any) -> Any:
    """Shear lag of a slotted tube by the length of its welds [factor]. AISC 360-16 Table D3.1."""
    return 1 - x_bar / l_min


@formula("phi_tau", WELDS, title="design strength of the throat", clause="9.7.3.10")
def throat_strength(phi: Any, f_uw: Any, k_r: Any) -> Any:
    """Design strength of a fillet weld on its throat [stress]. 9.7.3.10."""
    return phi * 0.6 * f_uw * k_r


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
