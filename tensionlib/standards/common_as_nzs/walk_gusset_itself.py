"""The walk of AS 4100 and NZS 3404 for the gusset itself: reversal, free edges, its support."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import gusset_in_compression as strip
from tensionlib.standards.common_as_nzs.gusset_in_compression import STRIP
from tensionlib.standards.common_as_nzs.rules import Rules


def gusset_itself(rules: Rules, work: Working, end: Inputs, N_c: Entry, f_yp: Entry) -> None:
    """What is stated of the gusset beyond the plate at the joint: nothing where nothing is."""
    for own in end.parts["gusset"]:
        if own.choice("spread"):
            work.note(own.choice("spread"), "practice")
            work.assume(
                f"{end.choice('label')}no notch of the gusset's outline lies between two of its"
                " bolts: the search for blocks takes the plate there as whole"
            )
        A_gp = end.kept("A_gp")
        if own.has("L_f") and A_gp is not None:
            _compression(rules, work, end, own, A_gp, f_yp)
        elif own.choice("reverses") == "yes":
            work.not_covered(
                "compression when the force reverses",
                "no support stands behind the joint along the member: state the free length",
                "practice",
            )
        if own.has("L_fe"):
            _free_edge(work, end, own, f_yp)
        for run in own.parts["support"]:
            _support_weld(rules, work, own, run, N_c)
        if own.choice("supports") == "several":
            work.not_covered(
                "weld to the supports",
                "how two supported edges share the force is the designer's: weld sizes to several"
                " edges are not checked",
                "practice",
            )


def _take(work: Working, own: Inputs, name: str) -> Entry:
    return own.take(work, name, STRIP[name])


def _compression(
    rules: Rules, work: Working, end: Inputs, own: Inputs, A_gp: Entry, f_yp: Entry
) -> None:
    lambda_n = work.step(
        strip.modified_slenderness,
        _take(work, own, "k_f"),
        _take(work, own, "L_f"),
        end.take(work, "t_p"),
        f_yp,
    )
    alpha_a = work.step(strip.member_factor, lambda_n)
    alpha_b = work.fixed(
        STRIP["alpha_b"], strip.SECTION_CONSTANT, "6.3.3", note="plate", source="from memory"
    )
    ratio = work.step(strip.slenderness_ratio, lambda_n, alpha_a, alpha_b)
    eta = work.step(strip.imperfection, ratio)
    xi = work.step(strip.xi_factor, ratio, eta)
    alpha_c = work.step(strip.reduction, xi, ratio)
    N_rc = work.step(strip.strip_capacity, alpha_c, A_gp, f_yp)
    phi = work.fixed(
        "phi",
        rules.factors.component,
        rules.factors.clause,
        note="connection component other than bolt, pin or weld",
    )
    capacity = work.step(strip.design_strip, phi, N_rc)
    work.check(
        "compression when the force reverses",
        _take(work, own, "N_star_r"),
        capacity,
        "6.1",
        note="the strip of the width that counts, as a column",
    )


def _free_edge(work: Working, end: Inputs, own: Inputs, f_yp: Entry) -> None:
    E = work.fixed(STRIP["E"], strip.YOUNG, "", note="from memory, sure")
    limit = work.step(strip.free_edge_limit, end.take(work, "t_p"), E, f_yp)
    work.check("free edge", _take(work, own, "L_fe"), limit, "practice", kind="advice")


def _support_weld(rules: Rules, work: Working, own: Inputs, run: Inputs, N_c: Entry) -> None:
    quality = own.choice("quality")
    phi = work.fixed(
        "phi",
        rules.factors.fillet[quality],
        rules.factors.clause,
        note=f"fillet weld of quality {quality}",
    )
    L_sw = _take(work, run, "L_sw")
    v_a = work.step(strip.weld_along, N_c, _take(work, run, "k_a"), L_sw)
    v_s = work.step(strip.weld_square, N_c, _take(work, run, "k_s"), L_sw, _take(work, run, "e_s1"))
    resultant = work.step(strip.weld_resultant, v_a, v_s)
    capacity = work.step(strip.weld_capacity, phi, own.take(work, "f_uw"), _take(work, own, "t_ws"))
    work.check("weld to the support", resultant, capacity, "9.7.3.10")
    work.assume("fillets on both faces of the gusset over the whole supported edge")
