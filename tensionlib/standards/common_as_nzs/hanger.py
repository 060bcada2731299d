"""Bolts in tension and in tension with shear, AS 4100:1998 and NZS 3404:1997 9.3.2.2, 9.3.2.3.

From memory, sure. That prying is allowed for is 9.1.8; the allowance and the bending of the
flange are common practice, no source. Shapes: floats or arrays (n,); units N, mm, MPa, rad.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import cos, sin, square
from tensionlib.calculation.formula import formula
from tensionlib.calculation.symbols import Notation, Symbol
from tensionlib.quantities import ANGLE, COUNT, FACTOR, FORCE, LENGTH, MOMENT
from tensionlib.standards.common_as_nzs.symbols import COMMON, SYMBOLS

STATICS = "statics"

HUNG = Notation(
    COMMON.source,
    [
        *SYMBOLS,
        Symbol("n_t", "n_{t}", COUNT, "bolts in tension"),
        Symbol("theta", r"\theta", ANGLE, "force off the bolts' axis", "θ"),
        Symbol("q", "q", FACTOR, "allowance for prying"),
        Symbol("N_star_tf", "N^{*}_{tf}", FORCE, "design tension of a bolt", "N*_tf"),
        Symbol("V_star_f", "V^{*}_{f}", FORCE, "design shear of a bolt", "V*_f"),
        Symbol("phiN_tf", r"\phi N_{tf}", FORCE, "design tension capacity of a bolt", "φN_tf"),
        Symbol("phiV_fh", r"\phi V_{fh}", FORCE, "design shear capacity of a hanger's bolt"),
        Symbol("U_tf", "U_{tf}", FACTOR, "sum of the squares of shear and tension"),
        Symbol("U_lim", r"U_{\lim}", FACTOR, "limit of the sum"),
        Symbol("s_t", "s_{t}", LENGTH, "bolt line to bolt line across the stem"),
        Symbol("b_f1", "b_{f1}", LENGTH, "bolt line to the face of the stem"),
        Symbol("p_t", "p_{t}", LENGTH, "length of flange that a bolt bends"),
        Symbol("t_f1", "t_{f1}", LENGTH, "thickness of the flange"),
        Symbol("M_star_f", "M^{*}_{f}", MOMENT, "design moment of the flange at a bolt", "M*_f"),
        Symbol("phiM_f", r"\phi M_{f}", MOMENT, "design moment capacity of the flange", "φM_f"),
    ],
)


@formula("N_star_tf", HUNG, title="tension of a bolt, prying allowed for", clause="9.1.8")
def bolt_tension_action(N_star_c: Any, theta: Any, q: Any, n_t: Any) -> Any:
    """Tension of one bolt, the force's part along it and the allowance [force]. 9.1.8, statics."""
    return N_star_c * cos(theta) * (1 + q) / n_t


@formula("V_star_f", HUNG, title="shear of a bolt", known=STATICS)
def bolt_shear_action(N_star_c: Any, theta: Any, n_t: Any) -> Any:
    """Shear of one bolt, the force's part across it [force]. Statics."""
    return N_star_c * sin(theta) / n_t


@formula("phiN_tf", HUNG, title="design tension capacity of a bolt", clause="9.3.2.2")
def design_tension(phi: Any, N_tf: Any) -> Any:
    """Design tension capacity of one bolt [force]. 9.3.2.2."""
    return phi * N_tf


@formula("U_tf", HUNG, title="shear and tension together", clause="9.3.2.3")
def shear_and_tension(V_star_f: Any, phiV_fb: Any, N_star_tf: Any, phiN_tf: Any) -> Any:
    """Sum of the squares of shear and tension over their capacities [factor]. 9.3.2.3."""
    return square(V_star_f / phiV_fb) + square(N_star_tf / phiN_tf)


@formula("b_f1", HUNG, title="bolt line to the face of the stem", known=STATICS)
def lever(s_t: Any, t_p: Any) -> Any:
    """Lever of a bolt's force on the flange [length]. Statics."""
    return (s_t - t_p) / 2


@formula("M_star_f", HUNG, title="moment of the flange at a bolt", known=STATICS)
def flange_moment(N_star_c: Any, theta: Any, n_t: Any, b_f1: Any) -> Any:
    """Moment of the flange at the stem, as a cantilever with no help from prying [moment]."""
    return N_star_c * cos(theta) / n_t * b_f1


@formula("phiM_f", HUNG, title="moment capacity of the flange at a bolt", known="common practice")
def flange_capacity(phi: Any, f_y: Any, p_t: Any, t_f1: Any) -> Any:
    """Plastic moment of the length of flange a bolt bends [moment]. Common practice, no source."""
    return phi * f_y * p_t * square(t_f1) / 4
