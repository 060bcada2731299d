"""Bolts in shear, alike for every bolted end: long joints, threads, packing, slip.

AS 4100:1998 and NZS 3404:1997 9.3.2.1, 9.3.2.5, 9.3.3.
"""

from __future__ import annotations

from collections.abc import Callable

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import bolts, pattern
from tensionlib.standards.common_as_nzs.rules import Rules


def joint_length(work: Working, end: Inputs) -> Entry | None:
    """The line for L_j, written once; None for one bolt along the force."""
    known = end.kept("L_j")
    if known is not None:
        return known
    if end.choice("kind") == "bolted pattern":
        return end.take(work, "L_j") if end.has("L_j") else None
    staggered = end.choice("pattern") == "staggered"
    if not end.has("s_p"):
        return end.take(work, "s_2") if staggered else None
    n_p, s_p = end.take(work, "n_p"), end.take(work, "s_p")
    if staggered:
        return end.keep(
            "L_j", work.step(bolts.joint_length_staggered, n_p, s_p, end.take(work, "s_2"))
        )
    return end.keep("L_j", work.step(bolts.joint_length, n_p, s_p))


def bolt_capacity(rules: Rules, work: Working, end: Inputs) -> tuple[Entry, Entry]:
    """Lines for the capacity factor and the nominal shear capacity of one bolt."""
    phi = work.fixed("phi", rules.factors.bolt, rules.factors.clause, note="bolt in shear")
    k_r = _joint_factor(work, end)
    f_uf = end.take(work, "f_uf")
    if end.choice("threads") == "in shear plane":
        V_f = work.step(
            bolts.shear_threads_in, f_uf, k_r, end.take(work, "n_n"), end.take(work, "A_c")
        )
    else:
        V_f = work.step(
            bolts.shear_threads_out, f_uf, k_r, end.take(work, "n_x"), end.take(work, "A_o")
        )
    if end.choice("bolt_class") == "10.9":
        V_f = _class_10_9(rules, work, end, V_f)
    return phi, _packed(work, end, V_f)


def _class_10_9(rules: Rules, work: Working, end: Inputs, V_f: Entry) -> Entry:
    """Bolts of class 10.9, which came with AS 4100:2020."""
    if rules.class_10_9 is None:
        work.not_covered(
            "bolts of class 10.9",
            f"this edition of {rules.name} has no bolts of class 10.9, as far as remembered",
            "9.3.2.1",
        )
        return V_f
    if end.choice("threads") != "in shear plane":
        return V_f
    k_rd = work.fixed(
        "k_rd",
        rules.class_10_9,
        "9.3.2.1",
        note="class 10.9, threads in the shear plane",
        source="from memory, fairly sure",
    )
    return work.step(bolts.lesser_ductility, k_rd, V_f, gives="V_frd")


def _joint_factor(work: Working, end: Inputs) -> Entry:
    L_j = joint_length(work, end)
    clause = "Table 9.3.2.1"
    if L_j is None:
        return work.fixed("k_r", 1.0, clause, note="one bolt along the force")
    if work.holds(bolts.short_joint, L_j, yes="no reduction"):
        return work.fixed("k_r", 1.0, clause, note="short joint")
    if work.holds(bolts.middle_joint, L_j, yes="reduction by length"):
        return work.step(bolts.long_joint_factor, L_j)
    return work.fixed("k_r", 0.75, clause, note="longest joints")


def _packed(work: Working, end: Inputs, V_f: Entry) -> Entry:
    """The capacity through packing: 15 % less from more than 6 mm to less than 20 mm."""
    if not end.has("t_k"):
        return V_f
    t_k = end.take(work, "t_k")
    if work.holds(bolts.thin_packing, t_k, yes="no reduction", no="reduced by 15 %"):
        return V_f
    if work.holds(bolts.middle_packing, t_k):
        return work.step(pattern.packed, V_f)
    work.not_covered(
        "bolts through packing",
        "packing of 20 mm or more in a shear plane has no rule: fix it with bolts of its own",
        "9.3.2.5",
    )
    return work.step(pattern.packed, V_f)


# From the force in service to that on the most loaded bolt.
OnBolt = Callable[[Entry], Entry]


def slip_check(rules: Rules, work: Working, end: Inputs, on_bolt: OnBolt | None = None) -> None:
    """Slip in service of tensioned friction bolts (TF): of all together where they share equally,
    else of the most loaded one, whose force `on_bolt` writes."""
    if end.choice("category") != "TF":
        return
    service = end.parts["service"]
    if not service:
        work.not_covered(
            "slip",
            "the force in service is not stated: give design(..., service='150 kN')",
            "9.3.3.1",
        )
        return
    if not end.has("N_ti"):
        work.not_covered(
            "slip", "the tension of this bolt as installed is not known to the library", "9.3.3.1"
        )
        return
    N_ser = service[0].take(work, "N_star_ser")
    phi = work.fixed("phi", rules.factors.slip, rules.slip_clause, note="slip in service")
    mu = end.take(work, "mu")
    kind = end.choice("hole_kind")
    k_h = work.fixed(
        "k_h", pattern.SLIP_FACTORS[kind], "9.3.3.1", note=f"{kind} holes", source="from memory"
    )
    V_sf = work.step(pattern.slip, mu, end.take(work, "n_ei"), end.take(work, "N_ti"), k_h)
    if on_bolt is not None:
        capacity = work.step(
            pattern.one_bolt,
            phi,
            V_sf,
            gives="phiV_sf",
            title="design slip capacity of a bolt",
            clause="9.3.3.1",
        )
        work.check("slip in service, most loaded bolt", on_bolt(N_ser), capacity, "9.3.3.1")
        return
    if end.choice("kind") == "bolted pattern":
        n_b = end.take(work, "n_b")
    else:
        n_b = bolt_count(work, end)
    work.check("slip in service", N_ser, work.step(pattern.design_slip, phi, n_b, V_sf), "9.3.3.1")


def bolt_count(work: Working, end: Inputs) -> Entry:
    """Bolts of a regular end over all gussets, written once."""
    known = end.kept("n_b")
    if known is not None:
        return known
    counts = [end.take(work, name) for name in ("n_g", "n_l", "n_p")]
    return end.keep("n_b", work.step(bolts.bolt_count, *counts))
