"""The walk of AS 4100 and NZS 3404 for a gusset on the width to which the force spreads."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import gusset
from tensionlib.standards.common_as_nzs.rules import Factors


def check_gusset(
    factors: Factors,
    work: Working,
    end: Inputs,
    N_c: Entry,
    b_d: Entry | None,
    f_yp: Entry,
    f_up: Entry,
) -> None:
    """Yielding and fracture of the gusset on the width that counts.

    `b_d` is the width by spread, None where the pattern has none (a single bolt).
    """
    b_e = check_width(work, end, end, b_d)
    if b_e is None:
        return
    phi = work.fixed(
        "phi",
        factors.component,
        factors.clause,
        note="connection component other than bolt, pin or weld",
    )
    n_g, t_p = end.take(work, "n_g"), end.take(work, "t_p")
    A_gp = end.keep("A_gp", work.step(gusset.gross_area, n_g, b_e, t_p))
    N_py = work.step(gusset.yielding, A_gp, f_yp)
    phiN_py = work.step(gusset.design_yielding, phi, N_py)
    work.check("yield", N_c, phiN_py, "7.2", note="on the width to which the force spreads")
    if end.choice("kind") == "bolted":
        A_np = work.step(
            gusset.net_area, n_g, b_e, end.take(work, "n_l"), end.kept_line("d_h"), t_p
        )
    elif end.choice("to") == "bar":
        A_np = work.step(gusset.net_area_slotted, n_g, b_e, end.take(work, "b"), t_p)
    else:
        A_np = A_gp
    N_pu = work.step(gusset.fracture, A_np, f_up)
    phiN_pu = work.step(gusset.design_fracture, phi, N_pu)
    work.check("rupture", N_c, phiN_pu, "7.2", note="on the width to which the force spreads")


def check_width(work: Working, end: Inputs, plate: Inputs, b_d: Entry | None) -> Entry | None:
    """The width that counts: by spread, or the stated width where that is less.

    `plate` holds the stated width b_p, if any. None where there is no width to go by: the word
    "not covered" is on the sheet then.
    """
    if b_d is None and not plate.has("b_p"):
        work.not_covered(
            "yield and rupture",
            "the force of a single bolt has no width by spread: state the gusset's width",
            "practice",
        )
        return None
    if b_d is None:
        return plate.take(work, "b_p")
    if not plate.has("b_p"):
        work.assume(
            f"{end.choice('label')}the gusset is at least as wide as the force spreads at the last"
            " bolts or the end of the welds, and the spread is not cut by its edges"
        )
        return b_d
    return work.least("b_e", b_d, plate.take(work, "b_p"), title="width that counts")
