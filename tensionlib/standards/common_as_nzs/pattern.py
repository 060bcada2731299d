"""A bolted end with any pattern of holes: AS 4100:1998 and NZS 3404:1997 9.1.10, 9.3.2, 9.4.

From memory. The chains, blocks and clear distances are found by the search of `joints`; what was
found enters as inputs, and the formulas of the clauses are written on it here. Shapes: floats or
arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import sqrt, square, tan
from tensionlib.calculation.formula import formula
from tensionlib.standards.common_as_nzs.gusset import PRACTICE, SPREAD
from tensionlib.standards.common_as_nzs.symbols import COMMON

STATICS = "statics"

# 14.3.5.2, from memory, sure of the values: kinds of hole, factor k_h for slip, 9.3.3.1.
SLIP_FACTORS = {"standard": 1.0, "oversize": 0.85, "short slot": 0.85, "long slot": 0.70}


@formula("A_d1", COMMON, title="first hole of the chain", clause="9.1.10")
def first_hole(d_h: Any, t: Any) -> Any:
    """Area of the first hole of a chain [area]. 9.1.10."""
    return d_h * t


@formula("A_d", COMMON, title="next hole, in line across", clause="9.1.10")
def next_hole(A_d: Any, d_h: Any, t: Any) -> Any:
    """Area lost so far and the next hole, no step along the force [area]. 9.1.10."""
    return A_d + d_h * t


@formula("A_d", COMMON, title="next hole, after a step along the force", clause="9.1.10")
def next_hole_staggered(A_d: Any, d_h: Any, t: Any, s: Any, s_g: Any, t_s: Any) -> Any:
    """Area lost so far and the next hole, less s²t/(4 s_g) for the step [area]. 9.1.10.

    `t_s` is the least thickness the step crosses: the thinner plate where it turns from one into
    another, the conservative reading.
    """
    return A_d + d_h * t - square(s) * t_s / (4 * s_g)


@formula("A_d", COMMON, title="area deducted for the holes", clause="9.1.10")
def all_components(n_c: Any, A_d: Any) -> Any:
    """The chain in each component [area]. 9.1.10."""
    return n_c * A_d


@formula("N_star_k", COMMON, title="force left at the chain", known=STATICS)
def force_left(N_star: Any, n_k: Any, n_b: Any) -> Any:
    """Force less what the bolts behind the chain have taken, sharing equally [force]. Statics."""
    return N_star * (1 - n_k / n_b)


@formula("V_star_b", COMMON, title="force on a bolt, shared equally", clause="9.4")
def equal_share(N_star_c: Any, n_b: Any) -> Any:
    """Force on each bolt [force]. 9.4."""
    return N_star_c / n_b


@formula("V_x", COMMON, title="along the member, direct force and moment", known=STATICS)
def share_along(N_star_c: Any, n_b: Any, e_b: Any, y_b: Any, I_b: Any) -> Any:
    """Force on a bolt along the member by elastic vectors [force]. Statics."""
    return N_star_c / n_b - N_star_c * e_b * y_b / I_b


@formula("V_y", COMMON, title="across the member, from the moment", known=STATICS)
def share_across(N_star_c: Any, e_b: Any, x_b: Any, I_b: Any) -> Any:
    """Force on a bolt across the member by elastic vectors [force]. Statics."""
    return N_star_c * e_b * x_b / I_b


@formula("V_star_b", COMMON, title="force on the bolt", known=STATICS)
def resultant(V_x: Any, V_y: Any) -> Any:
    """Resultant force on a bolt [force]. Statics."""
    return sqrt(square(V_x) + square(V_y))


@formula("phiV_fb", COMMON, title="design shear capacity of a bolt", clause="9.3.2.1")
def one_bolt(phi: Any, V_f: Any) -> Any:
    """Design shear capacity of one bolt, all its shear planes [force]. 9.3.2.1."""
    return phi * V_f


@formula("a_e", COMMON, title="clear distance, plus half a bolt", clause="9.3.2.4")
def clear(l_c: Any, d_f: Any) -> Any:
    """Edge of the hole to the next edge or hole, plus half the bolt diameter [length]. 9.3.2.4."""
    return l_c + d_f / 2


@formula("phiV_bb", COMMON, title="design capacity of the plies at a bolt", clause="9.3.2.4")
def plies_at_bolt(phi: Any, n_e: Any, V_bb: Any) -> Any:
    """Design capacity of all plies of one part at one bolt [force]. 9.3.2.4."""
    return phi * n_e * V_bb


# Tear-out blocks, 9.1.9 -------------------------------------------------------------------


@formula("A_gv", COMMON, title="gross shear area", clause="9.1.9")
def gross_shear(n_e: Any, L_gv: Any, t: Any) -> Any:
    """Gross shear area of a block in all plies [area]. 9.1.9."""
    return n_e * L_gv * t


@formula("A_nv", COMMON, title="net shear area", clause="9.1.9")
def net_shear(n_e: Any, L_gv: Any, h_v: Any, t: Any) -> Any:
    """Net shear area of a block in all plies [area]. 9.1.9."""
    return n_e * (L_gv - h_v) * t


@formula("A_nt", COMMON, title="net tension area", clause="9.1.9")
def net_tension(n_e: Any, b_gt: Any, h_t: Any, t: Any) -> Any:
    """Net tension area of a block in all plies [area]. 9.1.9."""
    return n_e * (b_gt - h_t) * t


@formula("A_nt", COMMON, title="net tension area, staggered", clause="9.1.9")
def net_tension_staggered(n_e: Any, b_gt: Any, h_t: Any, c_t: Any, t: Any) -> Any:
    """Net tension area of a block whose width in tension runs on a stagger [area]. 9.1.9."""
    return n_e * (b_gt - h_t + c_t) * t


@formula("N_star_s", COMMON, title="force on the block", known=STATICS)
def block_share(N_star_c: Any, n_sb: Any, n_m: Any) -> Any:
    """Force of the bolts that a block takes along, shared equally [force]. Statics."""
    return N_star_c * n_sb / n_m


@formula("N_star_m", COMMON, title="force through this element", known=STATICS)
def element_share(N_star_c: Any, n_m: Any, n_b: Any) -> Any:
    """Force of the bolts through one element of several, shared equally [force]. Statics."""
    return N_star_c * n_m / n_b


@formula("b_d", COMMON, title="width at the last bolts, 30° each side", known=PRACTICE)
def spread(s_o: Any, L_o1: Any, L_o2: Any) -> Any:
    """Width to which the force spreads from the outer bolts to the last row [length]."""
    return s_o + (L_o1 + L_o2) * tan(SPREAD)


@formula("A_np", COMMON, title="net area of the gusset", clause="9.1.10")
def gusset_net(n_g: Any, b_e: Any, t_p: Any, A_d: Any) -> Any:
    """Net area of the gussets on the width that counts, a chain's holes taken off [area]."""
    return n_g * (b_e * t_p - A_d)


# Packing and slip -------------------------------------------------------------------------


@formula("V_fk", COMMON, title="shear capacity of a bolt through packing", clause="9.3.2.5")
def packed(V_f: Any) -> Any:
    """Nominal shear capacity with packing of more than 6 mm in a shear plane [force]. 9.3.2.5."""
    return 0.85 * V_f


@formula("V_sf", COMMON, title="slip capacity of a bolt", clause="9.3.3.1")
def slip(mu: Any, n_ei: Any, N_ti: Any, k_h: Any) -> Any:
    """Nominal slip capacity of a tensioned friction bolt in service [force]. 9.3.3.1."""
    return mu * n_ei * N_ti * k_h


@formula("phiV_sf", COMMON, title="design slip capacity of the bolts", clause="9.3.3.1")
def design_slip(phi: Any, n_b: Any, V_sf: Any) -> Any:
    """Design slip capacity of all bolts in service [force]. 9.3.3.1."""
    return phi * n_b * V_sf
