"""Tension with bending, AS 4100:1998 and NZS 3404:1997 section 8, and what a tie does in service.

From memory, sure of the linear interaction 8.3.4, fairly sure of its number. The section's moment
capacity is taken on the elastic modulus of the outline, first yield at its worst corner: never
more than 5.2 gives a section whose plates do not buckle. Shapes: floats or arrays (n,); units N,
mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import sqrt, square
from tensionlib.calculation.formula import Constant, condition, formula
from tensionlib.calculation.symbols import Notation, Symbol
from tensionlib.quantities import (
    ELASTIC_MODULUS,
    FACTOR,
    FORCE,
    INERTIA,
    LENGTH,
    MODULUS,
    MOMENT,
    WEIGHT_PER_LENGTH,
)
from tensionlib.standards.common_as_nzs.symbols import COMMON, SYMBOLS

STATICS = "statics"
# Table 5.2, from memory, sure of the first two, fairly sure of the third: yield limits of a flat
# plate with one edge free, hot-rolled; with both edges held, cold-formed; of a round tube.
PLATE_LIMITS = {"outstand": 16.0, "wall": 40.0, "round": 82.0}
PLATE_WORDS = {
    "outstand": "flat plate, one edge free, hot-rolled",
    "wall": "flat plate, both edges held, cold-formed",
    "round": "circular hollow section",
}
YOUNG = 200e3  # MPa, 1.4 (AS 4100) and 1.4/2.2 (NZS 3404), from memory, sure
F_250 = Constant("250 MPa")

BENT = Notation(
    COMMON.source,
    [
        *SYMBOLS,
        Symbol("L_b", "L_{b}", LENGTH, "span of the member across the load"),
        Symbol("w_g", "w_{g}", WEIGHT_PER_LENGTH, "self-weight"),
        Symbol("gamma_g", r"\gamma_{g}", FACTOR, "load factor on the self-weight", "γ_g"),
        Symbol("w_x", "w_{x}", WEIGHT_PER_LENGTH, "load that bends about x, strength"),
        Symbol("w_y", "w_{y}", WEIGHT_PER_LENGTH, "load that bends about y, strength"),
        Symbol("e_x", "e_{x}", LENGTH, "offset of the force that bends about x"),
        Symbol("e_y", "e_{y}", LENGTH, "offset of the force that bends about y"),
        Symbol("M_w", "M_{w}", MOMENT, "moment of the load across the member"),
        Symbol("M_e", "M_{e}", MOMENT, "moment of the force off the member's line"),
        Symbol("M_star_x", "M^{*}_{x}", MOMENT, "design moment about x", "M*_x"),
        Symbol("M_star_y", "M^{*}_{y}", MOMENT, "design moment about y", "M*_y"),
        Symbol("Z_ex", "Z_{ex}", MODULUS, "effective section modulus about x"),
        Symbol("Z_ey", "Z_{ey}", MODULUS, "effective section modulus about y"),
        Symbol("Z_x", "Z_{x}", MODULUS, "elastic section modulus about x"),
        Symbol("Z_y", "Z_{y}", MODULUS, "elastic section modulus about y"),
        Symbol("M_sx", "M_{sx}", MOMENT, "nominal section moment capacity about x"),
        Symbol("M_sy", "M_{sy}", MOMENT, "nominal section moment capacity about y"),
        Symbol("b_s", "b_{s}", LENGTH, "clear width of the most slender plate"),
        Symbol("t_o", "t_{o}", LENGTH, "thickness of that plate"),
        Symbol("lambda_e", r"\lambda_{e}", FACTOR, "slenderness of the plate", "λ_e"),
        Symbol("lambda_ey", r"\lambda_{ey}", FACTOR, "yield slenderness limit", "λ_ey"),
        Symbol("U_s", "U_{s}", FACTOR, "sum of the ratios of tension and bending"),
        Symbol("U_max", r"U_{\max}", FACTOR, "limit of the sum"),
        Symbol("E", "E", ELASTIC_MODULUS, "Young's modulus"),
        Symbol("N_E", "N_{E}", FORCE, "tension that halves the sag"),
        Symbol("I_sag", "I_{s}", INERTIA, "second moment of area against the sag"),
        Symbol("Delta_L", r"\Delta_{L}", LENGTH, "stretch of the member in service", "Δ_L"),
        Symbol("Delta_0", r"\Delta_{0}", LENGTH, "sag without tension", "Δ_0"),
        Symbol("Delta_s", r"\Delta_{s}", LENGTH, "sag under tension", "Δ_s"),
        Symbol("Delta_max", r"\Delta_{\max}", LENGTH, "sag allowed", "Δ_max"),
        Symbol("Delta_Lmax", r"\Delta_{L,\max}", LENGTH, "stretch allowed", "Δ_L,max"),
        Symbol("r_c", "r_{c}", LENGTH, "least radius of gyration of one component"),
        Symbol("L_s", "L_{s}", LENGTH, "spacing of the ties between components"),
        Symbol("L_smax", r"L_{s,\max}", LENGTH, "greatest spacing of the ties"),
    ],
)


@formula("M_w", BENT, title="moment of the self-weight and the load", known=STATICS)
def moment_of_load(gamma_g: Any, w_g: Any, w_x: Any, L_b: Any) -> Any:
    """Moment at mid-span of a member on two supports [moment]. Statics."""
    return (gamma_g * w_g + w_x) * square(L_b) / 8


@formula("M_w", BENT, title="moment of the load from the side", known=STATICS)
def moment_of_side_load(w_y: Any, L_b: Any) -> Any:
    """Moment at mid-span of a member on two supports [moment]. Statics."""
    return w_y * square(L_b) / 8


@formula("M_e", BENT, title="moment of the force off the member's line", known=STATICS)
def moment_of_offset(N_star: Any, e_x: Any) -> Any:
    """Moment of the tension at its offset, constant along the member [moment]. Statics."""
    return N_star * e_x


@formula("M_star_x", BENT, title="design moment", known=STATICS)
def moments_added(M_w: Any, M_e: Any) -> Any:
    """Moments of load and offset, added whatever their sense [moment]. Statics."""
    return M_w + M_e


@formula("lambda_e", BENT, title="slenderness of the plate", clause="5.2.2")
def plate_slenderness(b_s: Any, t_o: Any, f_y: Any) -> Any:
    """Slenderness of a plate element, its yield stress against 250 MPa [factor]. 5.2.2."""
    return b_s / t_o * sqrt(f_y / F_250)


@formula("lambda_e", BENT, title="slenderness of the round wall", clause="5.2.2")
def round_slenderness(b_s: Any, t_o: Any, f_y: Any) -> Any:
    """Slenderness of a circular hollow section [factor]. 5.2.2."""
    return b_s / t_o * (f_y / F_250)


@condition(BENT, title="does the section yield before its outstands buckle", clause="Table 5.2")
def yields_first(lambda_e: Any, lambda_ey: Any) -> Any:
    return lambda_e <= lambda_ey


@formula("Z_ex", BENT, title="effective modulus of a slender section", clause="5.2.5")
def slender_modulus(Z_ex: Any, lambda_ey: Any, lambda_e: Any) -> Any:
    """Effective modulus where an outstand buckles before it yields [section modulus]. 5.2.5.

    The square is the reading for an outstand whose free edge is in compression, the lesser one.
    """
    return Z_ex * square(lambda_ey / lambda_e)


@formula("M_sx", BENT, title="section moment capacity", clause="5.2.1")
def section_moment(f_y: Any, Z_ex: Any) -> Any:
    """Nominal section moment capacity [moment]. 5.2.1."""
    return f_y * Z_ex


@formula("U_s", BENT, title="tension and bending together", clause="8.3.4")
def interaction(
    N_star: Any, phiN_t: Any, M_star_x: Any, phi: Any, M_sx: Any, M_star_y: Any, M_sy: Any
) -> Any:
    """Sum of the ratios, which is at most one [factor]. 8.3.4."""
    return N_star / phiN_t + M_star_x / (phi * M_sx) + M_star_y / (phi * M_sy)


@formula("Delta_L", BENT, title="stretch in service", known=STATICS)
def stretch(N_star_ser: Any, L: Any, E: Any, A_g: Any) -> Any:
    """Stretch of the member between its ends, its joints taken as rigid [length]. Statics."""
    return N_star_ser * L / (E * A_g)


@formula("Delta_0", BENT, title="sag under self-weight, no tension", known=STATICS)
def sag(w_g: Any, L_b: Any, E: Any, I_sag: Any) -> Any:
    """Mid-span sag of a member on two supports [length]. Statics."""
    return 5 * w_g * square(square(L_b)) / (384 * E * I_sag)


@formula("N_E", BENT, title="tension that halves the sag", known=STATICS)
def straightening(E: Any, I_sag: Any, L_b: Any) -> Any:
    """Euler's load of the span, π² taken as 9.8696 [force]. Statics."""
    return 9.8696 * E * I_sag / square(L_b)


@formula("Delta_s", BENT, title="sag in service, steadied by the tension", known=STATICS)
def sag_under_tension(Delta_0: Any, N_star_ser: Any, N_E: Any) -> Any:
    """Sag with the first term of its series in the tension [length]. Statics.

    Never less than the exact sag, and no more than 3 % above it (5π²/48 where tension is all).
    """
    return Delta_0 / (1 + N_star_ser / N_E)


@formula("L_smax", BENT, title="greatest spacing of the ties", clause="7.4.3")
def greatest_tie_spacing(r_c: Any) -> Any:
    """Spacing that keeps a component's slenderness at 300 [length]. 7.4.3, fairly sure."""
    return 300 * r_c
