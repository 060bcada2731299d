"""Pin connections, AS 4100:1998 and NZS 3404:1997 7.5 and 9.5, from memory, sure.

Bending of the pin between fork plates is statics: the eye presses evenly over its thickness and so
do the forks over theirs. Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import maximum, sqrt, square
from tensionlib.calculation.formula import formula
from tensionlib.calculation.symbols import Notation, Symbol
from tensionlib.quantities import AREA, COUNT, FACTOR, FORCE, LENGTH, MODULUS, MOMENT, STRESS
from tensionlib.standards.common_as_nzs.symbols import COMMON, SYMBOLS

STATICS = "statics"
ROTATION_FACTORS = {"no": 1.0, "yes": 0.5}  # k_p, 9.5.2, from memory, sure

PINS = Notation(
    COMMON.source,
    [
        *SYMBOLS,
        Symbol("d_p", "d_{p}", LENGTH, "diameter of the pin"),
        Symbol("d_hp", "d_{hp}", LENGTH, "diameter of the pin's hole"),
        Symbol("f_ypin", "f_{yp,pin}", STRESS, "yield stress of the pin"),
        Symbol("n_sp", "n_{sp}", COUNT, "shear planes of the pin"),
        Symbol("A_p", "A_{p}", AREA, "area of the pin"),
        Symbol("V_fp", "V_{fp}", FORCE, "nominal shear capacity of the pin"),
        Symbol("phiV_fp", r"\phi V_{fp}", FORCE, "design shear capacity of the pin", "φV_fp"),
        Symbol("k_p", "k_{p}", FACTOR, "factor for a pin that rotates"),
        Symbol("V_bp", "V_{bp}", FORCE, "nominal bearing capacity of the pin"),
        Symbol("phiV_bp", r"\phi V_{bp}", FORCE, "design bearing capacity of the pin", "φV_bp"),
        Symbol("n_f", "n_{f}", COUNT, "plates that bear on the pin"),
        Symbol("c_p", "c_{p}", LENGTH, "gap between eye and fork plate"),
        Symbol("M_star_p", "M^{*}_{p}", MOMENT, "design moment of the pin", "M*_p"),
        Symbol("S_p", "S_{p}", MODULUS, "plastic modulus of the pin"),
        Symbol("M_p", "M_{p}", MOMENT, "nominal moment capacity of the pin"),
        Symbol("phiM_p", r"\phi M_{p}", MOMENT, "design moment capacity of the pin", "φM_p"),
        Symbol("w_e", "w_{e}", LENGTH, "width of the plate at the hole"),
        Symbol("e_e", "e_{e}", LENGTH, "centre of the hole to the end of the plate"),
        Symbol("w_s", "w_{s}", LENGTH, "plate beside the hole, each side"),
        Symbol("t_4", "t_{\\min}", LENGTH, "least thickness beside the hole"),
        Symbol("A_req", "A_{\\mathrm{req}}", AREA, "net area required for the member"),
        Symbol("A_133", "A_{1.33}", AREA, "area required across the hole"),
        Symbol("e_45", "e_{45}", LENGTH, "centre of the hole to the side, at 45° to the force"),
        Symbol("r_b", "r_{b}", LENGTH, "least distance beyond the hole, from its centre"),
        Symbol("A_bey", "A_{b}", AREA, "net area beyond the hole"),
        Symbol("A_acr", "A_{a}", AREA, "net area across the hole"),
        Symbol("V_ppin", "V_{b,pin}", FORCE, "nominal capacity of the ply at the pin"),
        Symbol("phiV_ppin", r"\phi V_{b,pin}", FORCE, "design capacity of the plies at the pin"),
    ],
)


@formula("A_p", PINS, title="area of the pin", known=STATICS)
def pin_area(d_p: Any) -> Any:
    """Area of a round pin, π/4 taken as 0.7854 [area]."""
    return 0.7854 * square(d_p)


@formula("V_fp", PINS, title="pin in shear", clause="9.5.1")
def pin_shear(f_ypin: Any, n_sp: Any, A_p: Any) -> Any:
    """Nominal shear capacity of a pin [force]. 9.5.1."""
    return 0.62 * f_ypin * n_sp * A_p


@formula("phiV_fp", PINS, title="design capacity of the pin in shear", clause="9.5.1")
def design_pin(phi: Any, V_fp: Any) -> Any:
    """Design capacity of a pin in shear or bearing [force]. 9.5.1, 9.5.2."""
    return phi * V_fp


@formula("V_bp", PINS, title="bearing on the pin", clause="9.5.2")
def pin_bearing(f_ypin: Any, d_p: Any, n_f: Any, t: Any, k_p: Any) -> Any:
    """Nominal bearing capacity of a pin against plates of thickness t [force]. 9.5.2."""
    return 1.4 * f_ypin * d_p * n_f * t * k_p


@formula("M_star_p", PINS, title="moment of the pin", known=STATICS)
def pin_moment(N_star_c: Any, t: Any, c_p: Any, t_p: Any) -> Any:
    """Moment of a pin between fork plates of thickness t_p at mid-thickness of the eye [moment]."""
    return N_star_c * (t + 4 * c_p + 2 * t_p) / 8


@formula("S_p", PINS, title="plastic modulus of the pin", known=STATICS)
def pin_modulus(d_p: Any) -> Any:
    """Plastic modulus of a round pin [section modulus]."""
    return d_p * square(d_p) / 6


@formula("M_p", PINS, title="pin in bending", clause="9.5.3")
def pin_bending(f_ypin: Any, S_p: Any) -> Any:
    """Nominal moment capacity of a pin [moment]. 9.5.3."""
    return f_ypin * S_p


@formula("phiM_p", PINS, title="design capacity of the pin in bending", clause="9.5.3")
def design_bending(phi: Any, M_p: Any) -> Any:
    """Design moment capacity of a pin [moment]. 9.5.3."""
    return phi * M_p


@formula("A_n", PINS, title="net area across the eye's hole", clause="9.1.10")
def eye_net(w_e: Any, d_hp: Any, t: Any) -> Any:
    """Net area across the hole of an eye [area]. 9.1.10."""
    return (w_e - d_hp) * t


@formula("w_s", PINS, title="plate beside the hole", clause="7.5")
def beside(w_e: Any, d_hp: Any) -> Any:
    """Edge of the hole to the edge of the plate, square to the force [length]. 7.5."""
    return (w_e - d_hp) / 2


@formula("t_4", PINS, title="least thickness of an unstiffened plate", clause="7.5")
def least_thickness(w_s: Any) -> Any:
    """A quarter of the plate beside the hole [length]. 7.5."""
    return 0.25 * w_s


@formula("A_req", PINS, title="net area required for the member", clause="7.5")
def required_area(N_star: Any, phi: Any, f_y: Any, f_u: Any) -> Any:
    """Area that the force asks for in yielding or in fracture, the greater [area]. 7.2, 7.5."""
    return maximum(N_star / (phi * f_y), N_star / (phi * 0.85 * f_u))


@formula("A_133", PINS, title="area required across the hole", clause="7.5")
def required_across(A_req: Any) -> Any:
    """1.33 times the net area required [area]. 7.5."""
    return 1.33 * A_req


@formula("e_45", PINS, title="to the side edge, at 45° to the force", clause="7.5")
def side_at_45(w_e: Any) -> Any:
    """Centre of the hole to the plate's side on a line at 45° to the force [length]. 7.5, statics.

    A line nearer to the force's own reaches the side further off: of a square end, the least
    distance within 45° of the force is this one or the one straight to the end.
    """
    return w_e / sqrt(2)


@formula("A_bey", PINS, title="net area beyond the hole", clause="7.5")
def area_beyond(n_f: Any, r_b: Any, d_hp: Any, t: Any) -> Any:
    """Least net area beyond the hole within 45° of the force, all plates [area]. 7.5."""
    return n_f * (r_b - d_hp / 2) * t


@formula("A_acr", PINS, title="net area across the hole", clause="7.5")
def area_across(n_f: Any, w_s: Any, t: Any) -> Any:
    """Both sides of the hole, square to the force, all plates [area]. 7.5."""
    return n_f * 2 * w_s * t


@formula("a_e", PINS, title="edge of the hole to the end, plus half the pin", clause="9.3.2.4")
def clear_beyond(e_e: Any, d_hp: Any, d_p: Any) -> Any:
    """Edge of the hole to the end of the plate, plus half the pin [length]. 9.3.2.4."""
    return e_e - d_hp / 2 + d_p / 2


@formula("phiV_ppin", PINS, title="design capacity of the plies at the pin", clause="9.5.4")
def plies_at_pin(phi: Any, n_f: Any, V_ppin: Any) -> Any:
    """Design capacity of the plates at the pin, the lesser of bearing and tear-out [force]. 9.5.4,
    the number fairly sure."""
    return phi * n_f * V_ppin
