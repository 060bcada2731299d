"""The gusset on the width to which the force spreads.

The spread of 30 degrees each side from the first bolts (or the start of the welds) to the last is
common practice and no clause; on that width the gusset is proven as a tension member,
7.2. Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import tan
from tensionlib.calculation.formula import Constant, formula
from tensionlib.standards.common_as_nzs.symbols import COMMON

SPREAD = Constant("30 deg")
PRACTICE = "common practice, no source"


@formula(
    "b_d", COMMON, title="width at the last bolts, 30° each side", clause="practice", known=PRACTICE
)
def spread_bolts(n_l: Any, s_g: Any, L_j: Any) -> Any:
    """Width to which the force spreads over two lines of bolts [length]."""
    return (n_l - 1) * s_g + 2 * L_j * tan(SPREAD)


@formula(
    "b_d", COMMON, title="width at the last bolts, 30° each side", clause="practice", known=PRACTICE
)
def spread_staggered(n_l: Any, s_g: Any, L_j: Any, s_2: Any) -> Any:
    """Width over two staggered lines: the line that stands back spreads from its own first bolt,
    the other one from a stagger nearer the last [length]."""
    return (n_l - 1) * s_g + (2 * L_j - s_2) * tan(SPREAD)


@formula(
    "b_d", COMMON, title="width at the last bolt, 30° each side", clause="practice", known=PRACTICE
)
def spread_line(L_j: Any) -> Any:
    """Width to which the force spreads over one line of bolts [length]."""
    return 2 * L_j * tan(SPREAD)


@formula("b_d", COMMON, title="width at the one row of bolts", clause="practice", known=PRACTICE)
def spread_row(n_l: Any, s_g: Any) -> Any:
    """Width over one row of bolts across the force: the force has no length to spread [length]."""
    return (n_l - 1) * s_g


@formula(
    "b_d",
    COMMON,
    title="width at the end of the welds, 30° each side",
    clause="practice",
    known=PRACTICE,
)
def spread_welds(b: Any, l_min: Any) -> Any:
    """Width to which the force spreads along two runs of weld a width b apart [length]."""
    return b + 2 * l_min * tan(SPREAD)


@formula("A_gp", COMMON, title="gross area of the gusset", clause="7.2")
def gross_area(n_g: Any, b_e: Any, t_p: Any) -> Any:
    """Gross area of the gussets on the width that counts [area]. 7.2."""
    return n_g * b_e * t_p


@formula("A_np", COMMON, title="net area of the gusset", clause="9.1.10")
def net_area(n_g: Any, b_e: Any, n_l: Any, d_h: Any, t_p: Any) -> Any:
    """Net area of the gussets on the width that counts [area]. 9.1.10."""
    return n_g * (b_e - n_l * d_h) * t_p


@formula("A_np", COMMON, title="net area of the gusset, the bar's slot taken off", clause="9.1.10")
def net_area_slotted(n_g: Any, b_e: Any, b: Any, t_p: Any) -> Any:
    """Net area of a gusset with a slot as wide as the bar laid in it [area]. 9.1.10."""
    return n_g * (b_e - b) * t_p


@formula("N_py", COMMON, title="yielding of the gusset", clause="7.2")
def yielding(A_gp: Any, f_yp: Any) -> Any:
    """Nominal capacity of the gusset in gross yielding [force]. 7.2."""
    return A_gp * f_yp


@formula("N_pu", COMMON, title="fracture of the gusset", clause="7.2")
def fracture(A_np: Any, f_up: Any) -> Any:
    """Nominal capacity of the gusset in net fracture, force spread evenly [force]. 7.2, 7.3.1."""
    return 0.85 * A_np * f_up


@formula("phiN_py", COMMON, title="design capacity of the gusset, yielding", clause="7.1")
def design_yielding(phi: Any, N_py: Any) -> Any:
    """Design capacity of the gusset in gross yielding [force]. 7.1."""
    return phi * N_py


@formula("phiN_pu", COMMON, title="design capacity of the gusset, fracture", clause="7.1")
def design_fracture(phi: Any, N_pu: Any) -> Any:
    """Design capacity of the gusset in net fracture [force]. 7.1."""
    return phi * N_pu
