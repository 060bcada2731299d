"""Threaded rods, AS 4100:1998 and NZS 3404:1997 7.2, 9.1.4 and 9.3.2.2, from memory, sure.

The thread is proven both as a member's net section (7.2, on the tensile stress area) and as a
threaded fastener (9.3.2.2); the lesser holds. The sleeve's ring and the length of thread in it are
common practice. Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.dispatch import square
from tensionlib.calculation.formula import formula
from tensionlib.calculation.symbols import Notation, Symbol
from tensionlib.quantities import AREA, FORCE, LENGTH
from tensionlib.standards.common_as_nzs.symbols import COMMON, SYMBOLS

PRACTICE = "common practice, no source"

RODS = Notation(
    COMMON.source,
    [
        *SYMBOLS,
        Symbol("d_th", "d_{th}", LENGTH, "diameter of the thread"),
        Symbol("phiN_tf", r"\phi N_{tf}", FORCE, "design tension capacity of the thread", "φN_tf"),
        Symbol("R_f", "R_{f}", FORCE, "design capacity of fork and turnbuckle, certified"),
        Symbol("d_sl", "d_{sl}", LENGTH, "outside diameter of the sleeve"),
        Symbol("A_sl", "A_{sl}", AREA, "ring area of the sleeve"),
        Symbol("phiN_sl", r"\phi N_{sl}", FORCE, "design capacity of the sleeve", "φN_sl"),
        Symbol(
            "phiN_slu", r"\phi N_{sl,u}", FORCE, "design capacity of the sleeve, fracture", "φN_slu"
        ),
        Symbol("l_en", "l_{en}", LENGTH, "thread in the sleeve, each side"),
    ],
)


@formula("phiN_tf", RODS, title="design tension capacity of the thread", clause="9.3.2.2")
def thread_capacity(phi: Any, A_s: Any, f_u: Any) -> Any:
    """Design capacity of a thread as a fastener of the rod's steel [force]. 9.3.2.2."""
    return phi * A_s * f_u


@formula("N_min", RODS, title="the rod's own capacity", clause="9.1.4")
def rod_action(phiN_t: Any) -> Any:
    """Design action on a bracing rod that a turnbuckle tightens [force]. 9.1.4."""
    return 1.0 * phiN_t


@formula("A_sl", RODS, title="ring of the sleeve", known=PRACTICE)
def sleeve_area(d_sl: Any, d_th: Any) -> Any:
    """Area of a sleeve outside its thread, π/4 taken as 0.7854 [area]."""
    return 0.7854 * (square(d_sl) - square(d_th))


@formula("phiN_sl", RODS, title="design capacity of the sleeve", clause="7.2")
def sleeve_capacity(phi: Any, A_sl: Any, f_y: Any) -> Any:
    """Design capacity of a sleeve in yielding [force]. 7.2."""
    return phi * A_sl * f_y


@formula("phiN_slu", RODS, title="design capacity of the sleeve in fracture", clause="7.2")
def sleeve_fracture(phi: Any, A_sl: Any, f_u: Any) -> Any:
    """Design capacity of a sleeve in fracture of its ring [force]. 7.2."""
    return phi * 0.85 * A_sl * f_u
