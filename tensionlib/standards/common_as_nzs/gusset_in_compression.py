"""The gusset when the force reverses, AS 4100:1998 and NZS 3404:1997 6.3.3, and its support.

The strip of the width to which the force spreads is proven as a column; that is common practice,
no source, and so is its effective length: 1.2 times the free length unless stated, the value for a
strip whose held end may sway. The column curve is from memory, sure; the section constant 0.5 is
that of a plate, fairly sure. Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import maximum, sqrt, square
from tensionlib.calculation.formula import Constant, formula
from tensionlib.calculation.symbols import Notation, Symbol
from tensionlib.quantities import ELASTIC_MODULUS, FACTOR, FORCE, LENGTH, WELD_STRENGTH
from tensionlib.standards.common_as_nzs.symbols import COMMON, SYMBOLS

PRACTICE = "common practice, no source"
STATICS = "statics"
F_250 = Constant("250 MPa")
SECTION_CONSTANT = 0.5
YOUNG = 200e3  # MPa

STRIP = Notation(
    COMMON.source,
    [
        *SYMBOLS,
        Symbol("N_star_r", "N^{*}_{r}", FORCE, "compression when the force reverses", "N*_r"),
        Symbol("L_f", "L_{f}", LENGTH, "free length of the strip"),
        Symbol("k_f", "k_{L}", FACTOR, "effective length over the free length", "k_L"),
        Symbol("lambda_n", r"\lambda_{n}", FACTOR, "modified slenderness of the strip", "λ_n"),
        Symbol("alpha_a", r"\alpha_{a}", FACTOR, "compression member factor", "α_a"),
        Symbol("alpha_b", r"\alpha_{b}", FACTOR, "compression member section constant", "α_b"),
        Symbol("lambda_c", r"\lambda", FACTOR, "slenderness ratio of the strip", "λ"),
        Symbol("eta", r"\eta", FACTOR, "imperfection factor", "η"),
        Symbol("xi", r"\xi", FACTOR, "compression member factor ξ", "ξ"),
        Symbol("alpha_c", r"\alpha_{c}", FACTOR, "slenderness reduction factor", "α_c"),
        Symbol("N_rc", "N_{rc}", FORCE, "nominal capacity of the strip in compression"),
        Symbol("phiN_rc", r"\phi N_{rc}", FORCE, "design capacity of the strip", "φN_rc"),
        Symbol("E", "E", ELASTIC_MODULUS, "Young's modulus"),
        Symbol("L_fe", "L_{fe}", LENGTH, "longest free edge of the gusset"),
        Symbol("L_femax", r"L_{fe,\max}", LENGTH, "free edge that needs no stiffener"),
        Symbol("L_sw", "L_{sw}", LENGTH, "length of the supported edge"),
        Symbol("k_a", "k_{a}", FACTOR, "part of the force along the supported edge"),
        Symbol("k_s", "k_{s}", FACTOR, "part of the force square to it"),
        Symbol("e_s1", "e_{s1}", LENGTH, "lever of the force about the edge's middle"),
        Symbol("v_a", "v_{a}", WELD_STRENGTH, "force per length of weld, along the edge"),
        Symbol("v_s", "v_{s}", WELD_STRENGTH, "force per length of weld, square to the edge"),
        Symbol("v_star", "v^{*}", WELD_STRENGTH, "design force per length of weld", "v*"),
        Symbol("t_ws", "t_{ws}", LENGTH, "leg size of the fillets to the support"),
        Symbol(
            "phiv_ws", r"\phi v_{ws}", WELD_STRENGTH, "design capacity of such a fillet", "φv_ws"
        ),
    ],
)


@formula("lambda_n", STRIP, title="modified slenderness of the strip", clause="6.3.3")
def modified_slenderness(k_f: Any, L_f: Any, t_p: Any, f_yp: Any) -> Any:
    """Slenderness of a strip on its radius of gyration t/√12 [factor]. 6.3.3."""
    return k_f * L_f * sqrt(12) / t_p * sqrt(f_yp / F_250)


@formula("alpha_a", STRIP, title="compression member factor", clause="6.3.3")
def member_factor(lambda_n: Any) -> Any:
    """Factor of the column curve [factor]. 6.3.3."""
    return 2100 * (lambda_n - 13.5) / (square(lambda_n) - 15.3 * lambda_n + 2050)


@formula("lambda_c", STRIP, title="slenderness ratio", clause="6.3.3")
def slenderness_ratio(lambda_n: Any, alpha_a: Any, alpha_b: Any) -> Any:
    """Slenderness with the section's imperfections [factor]. 6.3.3."""
    return lambda_n + alpha_a * alpha_b


@formula("eta", STRIP, title="imperfection factor", clause="6.3.3")
def imperfection(lambda_c: Any) -> Any:
    """Imperfection factor, zero for the stockiest [factor]. 6.3.3."""
    return maximum(0.00326 * (lambda_c - 13.5), 0)


@formula("xi", STRIP, title="factor ξ", clause="6.3.3")
def xi_factor(lambda_c: Any, eta: Any) -> Any:
    """Factor ξ of the column curve [factor]. 6.3.3."""
    return (square(lambda_c / 90) + 1 + eta) / (2 * square(lambda_c / 90))


@formula("alpha_c", STRIP, title="slenderness reduction factor", clause="6.3.3")
def reduction(xi: Any, lambda_c: Any) -> Any:
    """Slenderness reduction factor [factor]. 6.3.3."""
    return xi * (1 - sqrt(1 - square(90 / (xi * lambda_c))))


@formula("N_rc", STRIP, title="strip in compression", clause="6.3.3")
def strip_capacity(alpha_c: Any, A_gp: Any, f_yp: Any) -> Any:
    """Nominal capacity of the strip as a column, its form factor 1 [force]. 6.3.3."""
    return alpha_c * A_gp * f_yp


@formula("phiN_rc", STRIP, title="design capacity in compression", clause="6.1")
def design_strip(phi: Any, N_rc: Any) -> Any:
    """Design capacity of the strip in compression [force]. 6.1."""
    return phi * N_rc


@formula(
    "L_femax",
    STRIP,
    title="free edge that needs no stiffener",
    clause="practice",
    known="AASHTO LRFD 6.14.2.8 as remembered, from memory, fairly sure; advice",
)
def free_edge_limit(t_p: Any, E: Any, f_yp: Any) -> Any:
    """Length of free edge a gusset may have without a stiffener [length]. Advice."""
    return 2.06 * t_p * sqrt(E / f_yp)


# The weld to the support ------------------------------------------------------------------


@formula("v_a", STRIP, title="along the edge, fillets on both faces", known=STATICS)
def weld_along(N_star_c: Any, k_a: Any, L_sw: Any) -> Any:
    """Force per length of each of two fillets along the supported edge [force per length]."""
    return N_star_c * k_a / (2 * L_sw)


@formula("v_s", STRIP, title="square to the edge, with the moment", known=STATICS)
def weld_square(N_star_c: Any, k_s: Any, L_sw: Any, e_s1: Any) -> Any:
    """Greatest force per length of each fillet square to the edge [force per length]. Statics."""
    return N_star_c * k_s / (2 * L_sw) + 3 * N_star_c * e_s1 / square(L_sw)


@formula("v_star", STRIP, title="resultant on the fillet", known=STATICS)
def weld_resultant(v_a: Any, v_s: Any) -> Any:
    """Resultant force per length of a fillet [force per length]. Statics."""
    return sqrt(square(v_a) + square(v_s))


@formula("phiv_ws", STRIP, title="design capacity of the fillet", clause="9.7.3.10")
def weld_capacity(phi: Any, f_uw: Any, t_ws: Any) -> Any:
    """Design capacity of a fillet per length on its throat [force per length]. 9.7.3.10."""
    return phi * 0.6 * f_uw * t_ws / sqrt(2)
