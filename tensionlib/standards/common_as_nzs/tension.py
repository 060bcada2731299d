"""Members subject to axial tension, AS 4100:1998 and NZS 3404:1997 section 7, and holes, 9.1.10.

All from memory. Every function takes floats or arrays of shape (n,) in N, mm and MPa and gives
the same; a formula itself raises nothing, the door and the walk refuse bad input before it.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from tensionlib.calculation.dispatch import square
from tensionlib.calculation.formula import condition, formula
from tensionlib.standards.common_as_nzs.symbols import COMMON


@formula("N_ty", COMMON, title="yielding of the gross section", clause="7.2")
def gross_yielding(A_g: Any, f_y: Any) -> Any:
    """Nominal section capacity, yielding of the gross section [force]. 7.2."""
    return A_g * f_y


@formula("N_tu", COMMON, title="fracture of the net section", clause="7.2")
def net_fracture(k_t: Any, A_n: Any, f_u: Any) -> Any:
    """Nominal section capacity, fracture of the net section [force]. 7.2."""
    return 0.85 * k_t * A_n * f_u


@formula("phiN_ty", COMMON, title="design capacity, gross yielding", clause="7.1")
def design_gross_yielding(phi: Any, N_ty: Any) -> Any:
    """Design capacity in gross yielding [force]. 7.1."""
    return phi * N_ty


@formula("phiN_tu", COMMON, title="design capacity, net fracture", clause="7.1")
def design_net_fracture(phi: Any, N_tu: Any) -> Any:
    """Design capacity in net fracture [force]. 7.1."""
    return phi * N_tu


@formula("d_h", COMMON, title="diameter of the hole", clause="14.3.5.2")
def hole_diameter(d_f: Any, c_h: Any) -> Any:
    """Hole diameter [length]: bolt diameter and clearance. 14.3.5.2."""
    return d_f + c_h


@formula("A_d", COMMON, title="area deducted for the holes", clause="9.1.10")
def deduction_straight(n_e: Any, n_l: Any, d_h: Any, t: Any) -> Any:
    """Area of the holes in one straight line across the connected elements [area]. 9.1.10."""
    return n_e * n_l * d_h * t


@formula("A_d1", COMMON, title="straight line through the holes of one line", clause="9.1.10")
def deduction_one_hole(n_e: Any, d_h: Any, t: Any) -> Any:
    """Deduction along a straight line when the two lines are staggered [area]. 9.1.10."""
    return n_e * d_h * t


@formula("A_d2", COMMON, title="zigzag through both lines", clause="9.1.10")
def deduction_zigzag(n_e: Any, d_h: Any, t: Any, s: Any, s_g: Any) -> Any:
    """Deduction along the zigzag through two holes, less s²t/(4 s_g) for its step [area]. 9.1.10.

    `s` is the stagger of the step along the force, `s_g` its gauge across the force.
    """
    return n_e * (2 * d_h * t - square(s) * t / (4 * s_g))


@formula("s_3", COMMON, title="stagger seen from the next bolt", clause="9.1.10")
def stagger_to_next(s_p: Any, s_2: Any) -> Any:
    """Stagger between a bolt of the second line and the next one of the first [length]."""
    return s_p - s_2


@formula("A_n", COMMON, title="net area", clause="9.1.10")
def net_area(A_g: Any, A_d: Any) -> Any:
    """Net area of the cross-section [area]. 9.1.10."""
    return A_g - A_d


@formula("A_d", COMMON, title="area of the slots", clause="")
def deduction_slots(n_s: Any, t: Any, t_p: Any, c_s: Any) -> Any:
    """Area cut out of a tube's walls by the slots for the gusset [area]."""
    return n_s * t * (t_p + c_s)


@condition(COMMON, title="is the joint as long as the section is deep", clause="Table 7.3.2")
def joint_covers_depth(L_j: Any, d: Any) -> Any:
    return L_j >= d


@condition(COMMON, title="is the weld as long as the section is deep", clause="Table 7.3.2")
def weld_covers_depth(l_min: Any, d: Any) -> Any:
    return l_min >= d


@formula("lambda_r", COMMON, title="slenderness", clause="", known="common practice, no source")
def slenderness(L: Any, r_min: Any) -> Any:
    """Length over the least radius of gyration [factor]. Common practice, no source."""
    return L / r_min


@dataclass(frozen=True)
class ConnectionCase:
    """A row of Table 7.3.2: k_t (k_te in NZS 3404), the row in our words, how sure."""

    k_t: float
    words: str
    clause: str = "Table 7.3.2"
    sure: str = "from memory, sure"


# Keys: what the ends layer calls the connection; see `walk.connection_case`. Values from memory.
CASES: dict[str, ConnectionCase] = {
    "angle by short leg": ConnectionCase(0.75, "unequal angle connected by its short leg"),
    "angle by one leg": ConnectionCase(0.85, "angle connected by its long leg, or equal angle"),
    "channel by web": ConnectionCase(0.85, "channel connected by its web only"),
    "tee by flange": ConnectionCase(
        0.90, "tee connected by its flange only", sure="from memory, fairly sure"
    ),
    "both flanges": ConnectionCase(
        0.85,
        "section connected by both flanges only, joint at least as long as the section is deep",
        sure="from memory, fairly sure",
    ),
    "back to back": ConnectionCase(
        1.0, "two equal components on opposite sides of the gusset, tied together as 7.4 asks"
    ),
    "all elements": ConnectionCase(
        1.0, "bolts through every element of the section", clause="7.3.1"
    ),
    "concentric": ConnectionCase(1.0, "force spread evenly over the whole section", clause="7.3.1"),
}
