"""Block shear of regular patterns, as practised.

The form of AS 4100:2020 9.1.9, from memory, fairly sure: the lesser of shear fracture on the net
and shear yielding on the gross shear area, plus fracture on the net tension area, the tension
taken as uniform (k_bs = 1.0). NZS 3404:1997 as remembered has no rule of its own and practice
takes this one. Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import minimum
from tensionlib.calculation.formula import formula
from tensionlib.joints.blocks import Form
from tensionlib.standards.common_as_nzs.symbols import COMMON

UNIFORM, NON_UNIFORM = 1.0, 0.5
CLAUSE = "9.1.9"
KNOWN = "from memory, fairly sure"


def block_forms(f_y: float, f_u: float, uniform: bool) -> tuple[Form, ...]:
    """The two forms of 9.1.9 as coefficients of the areas, MPa: the lesser holds."""
    k_bs = UNIFORM if uniform else NON_UNIFORM
    return (
        Form(gv=0.0, nv=0.6 * f_u, gt=0.0, nt=k_bs * f_u),
        Form(gv=0.6 * f_y, nv=0.0, gt=0.0, nt=k_bs * f_u),
    )


@formula("L_v", COMMON, title="length of a shear plane", clause=CLAUSE, known=KNOWN)
def shear_length(e_1: Any, n_p: Any, s_p: Any) -> Any:
    """End of the ply to the last bolt of a line [length]."""
    return e_1 + (n_p - 1) * s_p


@formula("A_gv", COMMON, title="gross shear area", clause=CLAUSE, known=KNOWN)
def gross_shear(n_e: Any, n_v: Any, L_v: Any, t: Any) -> Any:
    """Gross area of the shear planes of all plies [area]."""
    return n_e * n_v * L_v * t


@formula("A_nv", COMMON, title="net shear area", clause=CLAUSE, known=KNOWN)
def net_shear(n_e: Any, n_v: Any, L_v: Any, n_p: Any, d_h: Any, t: Any) -> Any:
    """Net area of the shear planes of all plies, the last hole counted half [area]."""
    return n_e * n_v * (L_v - (n_p - 0.5) * d_h) * t


@formula("A_nt", COMMON, title="net tension area", clause=CLAUSE, known=KNOWN)
def net_tension(n_e: Any, b_t: Any, t: Any) -> Any:
    """Net area of the tension plane of all plies [area]."""
    return n_e * b_t * t


@formula("b_t", COMMON, title="net width in tension, bolt line to edge", clause=CLAUSE, known=KNOWN)
def width_to_edge(e_2: Any, d_h: Any) -> Any:
    """One line of bolts to the edge beside it [length]."""
    return e_2 - d_h / 2


@formula(
    "b_t", COMMON, title="net width in tension, both lines to the edge", clause=CLAUSE, known=KNOWN
)
def width_two_to_edge(s_g: Any, e_2: Any, d_h: Any) -> Any:
    """The farther of two lines to the edge, across the nearer [length]."""
    return s_g + e_2 - 1.5 * d_h


@formula("b_t", COMMON, title="net width in tension, between the lines", clause=CLAUSE, known=KNOWN)
def width_between(s_g: Any, d_h: Any) -> Any:
    """Between two lines of bolts [length]."""
    return s_g - d_h


@formula(
    "b_t", COMMON, title="net width in tension, each line to its edge", clause=CLAUSE, known=KNOWN
)
def width_both_edges(e_2: Any, d_h: Any) -> Any:
    """Each of two lines to the edge on its side [length]."""
    return 2 * (e_2 - d_h / 2)


@formula("N_bs", COMMON, title="block shear", clause=CLAUSE, known=KNOWN)
def block_shear(f_u: Any, A_nv: Any, f_y: Any, A_gv: Any, k_bs: Any, A_nt: Any) -> Any:
    """Nominal capacity of a tear-out block [force]."""
    return minimum(0.6 * f_u * A_nv, 0.6 * f_y * A_gv) + k_bs * f_u * A_nt


@formula("phiN_bs", COMMON, title="design capacity of the block", clause=CLAUSE, known=KNOWN)
def design_block(phi: Any, N_bs: Any) -> Any:
    """Design capacity of a tear-out block [force]."""
    return phi * N_bs
