"""Bolted connections, AS 4100:1998 and NZS 3404:1997 9.1.4, 9.3.2 and 9.4.

From memory; AS 4100 capacity tables, whose published values the tests reproduce, agree. What
the two standards write in different ways, the bearing of a ply, stands with each of them.

Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.formula import Constant, condition, formula
from tensionlib.standards.common_as_nzs.symbols import COMMON

MINIMUM_ACTION_CLAUSE = "9.1.4"

L_300 = Constant("300 mm")
L_1300 = Constant("1300 mm")
L_4000 = Constant("4000 mm")
T_6 = Constant("6 mm")
T_20 = Constant("20 mm")


@formula("N_min", COMMON, title="minimum design action on the connection", clause="9.1.4")
def minimum_action(phiN_t: Any) -> Any:
    """Least force a tension member's end connection is designed for [force]. 9.1.4."""
    return 0.3 * phiN_t


@formula("n_b", COMMON, title="bolts in the connection")
def bolt_count(n_g: Any, n_l: Any, n_p: Any) -> Any:
    """Number of bolts over all gussets [count]."""
    return n_g * n_l * n_p


@formula("L_j", COMMON, title="length of the joint", clause="9.3.2.1")
def joint_length(n_p: Any, s_p: Any) -> Any:
    """First to last bolt along the force [length]. 9.3.2.1."""
    return (n_p - 1) * s_p


@formula("L_j", COMMON, title="length of the joint", clause="9.3.2.1")
def joint_length_staggered(n_p: Any, s_p: Any, s_2: Any) -> Any:
    """First bolt of one line to last of the other, along the force [length]. 9.3.2.1."""
    return (n_p - 1) * s_p + s_2


@condition(COMMON, title="is the joint short", clause="Table 9.3.2.1")
def short_joint(L_j: Any) -> Any:
    return L_j <= L_300


@condition(COMMON, title="is the joint of middle length", clause="Table 9.3.2.1")
def middle_joint(L_j: Any) -> Any:
    return L_j <= L_1300


@condition(COMMON, title="is the packing thin", clause="9.3.2.5")
def thin_packing(t_k: Any) -> Any:
    return t_k <= T_6


@condition(COMMON, title="is the packing thinner than the rule ends", clause="9.3.2.5")
def middle_packing(t_k: Any) -> Any:
    return t_k < T_20


@formula("k_r", COMMON, title="reduction for the long joint", clause="Table 9.3.2.1")
def long_joint_factor(L_j: Any) -> Any:
    """Reduction factor of a bolted lap joint of 300 mm to 1300 mm [factor]. Table 9.3.2.1."""
    return 1.075 - L_j / L_4000


@formula(
    "V_f", COMMON, title="shear capacity of a bolt, threads in the shear plane", clause="9.3.2.1"
)
def shear_threads_in(f_uf: Any, k_r: Any, n_n: Any, A_c: Any) -> Any:
    """Nominal shear capacity of a bolt with threads in each shear plane [force]. 9.3.2.1."""
    return 0.62 * f_uf * k_r * n_n * A_c


@formula(
    "V_f", COMMON, title="shear capacity of a bolt, shank in the shear plane", clause="9.3.2.1"
)
def shear_threads_out(f_uf: Any, k_r: Any, n_x: Any, A_o: Any) -> Any:
    """Nominal shear capacity of a bolt with its shank in each shear plane [force]. 9.3.2.1."""
    return 0.62 * f_uf * k_r * n_x * A_o


@formula("V_f", COMMON, title="shear capacity of a bolt of class 10.9", clause="9.3.2.1")
def lesser_ductility(k_rd: Any, V_f: Any) -> Any:
    """Nominal shear capacity of a bolt of class 10.9, threads in the shear plane [force]. 9.2.2.1
    of AS 4100:2020."""
    return k_rd * V_f


@formula("N_tf", COMMON, title="tension capacity of a bolt", clause="9.3.2.2")
def bolt_tension(A_s: Any, f_uf: Any) -> Any:
    """Nominal tension capacity of a bolt [force]. 9.3.2.2. No end on offer puts a bolt in tension;
    the formula stands here for a user's own working."""
    return A_s * f_uf


@formula("phiV_f", COMMON, title="design shear capacity of the bolts", clause="9.3.2.1")
def design_shear(phi: Any, n_b: Any, V_f: Any) -> Any:
    """Design shear capacity of the bolts, sharing the force equally [force]. 9.3.2.1, 9.4."""
    return phi * n_b * V_f


@formula("V_bt", COMMON, title="tear-out of the ply at a bolt", clause="9.3.2.4")
def ply_tear_out(a_e: Any, t: Any, f_u: Any) -> Any:
    """Nominal tear-out capacity of a ply at one bolt [force]. 9.3.2.4."""
    return a_e * t * f_u


@formula(
    "a_e1",
    COMMON,
    title="ahead of the end bolt: hole edge to end, plus half a bolt",
    clause="9.3.2.4",
)
def clear_end(e_1: Any, d_h: Any, d_f: Any) -> Any:
    """Edge of the hole to the end of the ply, plus half the bolt diameter [length]. 9.3.2.4."""
    return e_1 - d_h / 2 + d_f / 2


@formula(
    "a_e2",
    COMMON,
    title="between bolts: hole edge to hole edge, plus half a bolt",
    clause="9.3.2.4",
)
def clear_between(s_p: Any, d_h: Any, d_f: Any) -> Any:
    """Edge of one hole to the edge of the next, plus half the bolt diameter [length]. 9.3.2.4."""
    return s_p - d_h + d_f / 2


@formula("phiV_b", COMMON, title="design capacity of the plies", clause="9.3.2.4")
def design_ply(phi: Any, n_e: Any, n_l: Any, n_p: Any, V_b: Any) -> Any:
    """Design capacity of the plies at all bolts, each at the weakest bolt's value [force]."""
    return phi * n_e * n_l * n_p * V_b
