"""The walk of AS 4100 and NZS 3404 for a gusset hung from its support by bolts in tension."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import bolts, hanger, pattern
from tensionlib.standards.common_as_nzs.hanger import HUNG
from tensionlib.standards.common_as_nzs.rules import Rules


def hanger_checks(rules: Rules, work: Working, end: Inputs, N_c: Entry) -> None:
    """Bolts in tension, with shear where the force is inclined, and the flange in bending."""
    for hung in end.parts["hanger"]:
        with work.part(end.choice("label") + "Hanger"):
            _hanger(rules, work, end, hung, N_c)


def _hanger(rules: Rules, work: Working, end: Inputs, hung: Inputs, N_c: Entry) -> None:
    def take(name: str) -> Entry:
        return hung.take(work, name, HUNG[name])

    n_t, q, theta = take("n_t"), take("q"), take("theta")
    tension = work.step(hanger.bolt_tension_action, N_c, theta, q, n_t)
    phi = work.fixed("phi", rules.factors.bolt, rules.factors.clause, note="bolt in tension")
    N_tf = work.step(bolts.bolt_tension, take("A_s"), take("f_uf"))
    phiN_tf = work.step(hanger.design_tension, phi, N_tf)
    work.check("bolt tension", tension, phiN_tf, "9.3.2.2")
    if hung.choice("inclined") == "yes":
        one = work.fixed("k_r", 1.0, "Table 9.3.2.1", note="no lap along the force")
        if hung.choice("threads") == "in shear plane":
            V_f = work.step(bolts.shear_threads_in, take("f_uf"), one, take("n_n"), take("A_c"))
        else:
            V_f = work.step(bolts.shear_threads_out, take("f_uf"), one, take("n_x"), take("A_o"))
        phiV_f = work.step(pattern.one_bolt, phi, V_f)
        shear = work.step(hanger.bolt_shear_action, N_c, theta, n_t)
        work.check("bolt shear", shear, phiV_f, "9.3.2.1")
        total = work.step(hanger.shear_and_tension, shear, phiV_f, tension, phiN_tf)
        limit = work.fixed(HUNG["U_lim"], 1.0, "9.3.2.3")
        work.check("shear and tension together", total, limit, "9.3.2.3")
    b = work.step(hanger.lever, take("s_t"), end.take(work, "t_p"))
    moment = work.step(hanger.flange_moment, N_c, theta, n_t, b)
    phi_m = work.fixed(
        "phi",
        rules.factors.component,
        rules.factors.clause,
        note="connection component other than bolt, pin or weld",
    )
    t_f1 = take("t_f1")
    f_y = hung.read(work, "f_y", t_f1)
    capacity = work.step(hanger.flange_capacity, phi_m, f_y, take("p_t"), t_f1)
    work.check("flange in bending", moment, capacity, "practice")
    work.leaves_out("the support that the hanger's bolts are fixed to, and its own bending")
