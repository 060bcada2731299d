"""The walk of AS 4100 and NZS 3404 for a bolted end: bolts, plies, gusset, distances."""

from __future__ import annotations

from tensionlib.calculation.formula import Formula
from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import bolts, detailing, gusset
from tensionlib.standards.common_as_nzs.bolts_in_shear import (
    bolt_capacity,
    bolt_count,
    joint_length,
    slip_check,
)
from tensionlib.standards.common_as_nzs.rules import Rules
from tensionlib.standards.common_as_nzs.walk_block import (
    Ply,
    check_blocks,
    gusset_blocks,
    member_blocks,
)
from tensionlib.standards.common_as_nzs.walk_gusset import check_gusset
from tensionlib.standards.common_as_nzs.walk_gusset_itself import gusset_itself


def bolted_end(
    rules: Rules, work: Working, end: Inputs, N_c: Entry, f_y: Entry, f_u: Entry
) -> None:
    """Write the checks of a bolted end for the design action on the connection."""
    label = end.choice("label")
    with work.part(label + "Bolts"):
        _bolts_in_shear(rules, work, end, N_c)
    with work.part(label + "Member at the bolts"):
        _member_plies(rules, work, end, N_c, f_u)
        if blocks := member_blocks(end):
            if end.choice("side_edge") != "none":
                end.keep("e_2", _side_distance(work, end))
            n_e, e_1, t = (end.take(work, name) for name in ("n_e", "e_1", "t"))
            ply = Ply(n_e, e_1, t, f_y, f_u, "e_2", "")
            check_blocks(rules.block, work, end, N_c, blocks, ply)
    with work.part(label + "Gusset"):
        t_p = end.take(work, "t_p")
        f_yp, f_up = end.read(work, "f_yp", t_p), end.read(work, "f_up", t_p)
        _gusset_plies(rules, work, end, N_c, t_p, f_up)
        check_gusset(rules.factors, work, end, N_c, _spread(work, end), f_yp, f_up)
        gusset_itself(rules, work, end, N_c, f_yp)
        n_g, e_p = end.take(work, "n_g"), end.take(work, "e_p")
        ply = Ply(n_g, e_p, t_p, f_yp, f_up, "e_s", "p")
        check_blocks(rules.block, work, end, N_c, gusset_blocks(end), ply)
    with work.part(label + "Bolt distances"):
        _distances(work, end)


def _bolts_in_shear(rules: Rules, work: Working, end: Inputs, N_c: Entry) -> None:
    phi, V_f = bolt_capacity(rules, work, end)
    capacity = work.step(bolts.design_shear, phi, bolt_count(work, end), V_f)
    work.check("bolt shear", N_c, capacity, "9.3.2.1")
    slip_check(rules, work, end)


def _least_clear(work: Working, end: Inputs, distance: str, symbols: tuple[str, str, str]) -> Entry:
    """Least clear length a_e of a ply: ahead of the end bolt, and between bolts."""
    d_h, d_f = end.kept_line("d_h"), end.take(work, "d_f")
    first, second, least = symbols
    ahead = work.step(bolts.clear_end, end.take(work, distance), d_h, d_f, gives=first)
    if not end.has("s_p"):
        return ahead
    between = work.step(bolts.clear_between, end.take(work, "s_p"), d_h, d_f, gives=second)
    return work.least(least, ahead, between, title="least clear length", clause="9.3.2.4")


def _member_plies(rules: Rules, work: Working, end: Inputs, N_c: Entry, f_u: Entry) -> None:
    phi = work.fixed("phi", rules.factors.ply, rules.factors.clause, note="ply in bearing")
    d_f, t = end.take(work, "d_f"), end.take(work, "t")
    a_e = _least_clear(work, end, "e_1", ("a_e1", "a_e2", "a_e"))
    title = "bearing of the ply at a bolt"
    bearing = rules.bearing(work, end, d_f, t, f_u, "V_bb", title)
    tear_out = work.step(bolts.ply_tear_out, a_e, t, f_u)
    V_b = work.least("V_b", bearing, tear_out, title="capacity of the ply at a bolt")
    count = [end.take(work, name) for name in ("n_e", "n_l", "n_p")]
    capacity = work.step(bolts.design_ply, phi, *count, V_b)
    work.check("ply bearing and tear-out", N_c, capacity, "9.3.2.4")


def _gusset_plies(
    rules: Rules, work: Working, end: Inputs, N_c: Entry, t_p: Entry, f_up: Entry
) -> None:
    phi = work.fixed("phi", rules.factors.ply, rules.factors.clause, note="ply in bearing")
    a_p = _least_clear(work, end, "e_p", ("a_p1", "a_p2", "a_p"))
    d_f, title = end.take(work, "d_f"), "bearing of the gusset at a bolt"
    bearing = rules.bearing(work, end, d_f, t_p, f_up, "V_pb", title)
    tear_out = work.step(
        bolts.ply_tear_out, a_p, t_p, f_up, gives="V_pt", title="tear-out of the gusset at a bolt"
    )
    V_p = work.least("V_p", bearing, tear_out, title="capacity of the gusset at a bolt")
    count = [end.take(work, name) for name in ("n_g", "n_l", "n_p")]
    capacity = work.step(bolts.design_ply, phi, *count, V_p, gives="phiV_p")
    work.check("ply bearing and tear-out", N_c, capacity, "9.3.2.4")


def _spread(work: Working, end: Inputs) -> Entry | None:
    """The width to which the force spreads; None for a single bolt, which has none."""
    L_j = joint_length(work, end)
    if end.has("s_g"):
        n_l, s_g = end.take(work, "n_l"), end.take(work, "s_g")
        if L_j is None:
            return work.step(gusset.spread_row, n_l, s_g)
        if end.choice("pattern") == "staggered":
            return work.step(gusset.spread_staggered, n_l, s_g, L_j, end.take(work, "s_2"))
        return work.step(gusset.spread_bolts, n_l, s_g, L_j)
    return None if L_j is None else work.step(gusset.spread_line, L_j)


# Distances --------------------------------------------------------------------------------


def _distances(work: Working, end: Inputs) -> None:
    d_f, t, t_p = (end.take(work, name) for name in ("d_f", "t", "t_p"))
    t_thin = work.least("t_thin", t, t_p, title="thinner ply")
    s_min = work.step(detailing.least_pitch, d_f)
    limit = work.fixed("s_lim", detailing.PITCH_LIMIT, "9.6.3", note="limit of the clause")
    s_max = work.least(
        "s_max",
        work.step(detailing.fifteen_plies, t_thin),
        limit,
        title="greatest distance between bolts",
        clause="9.6.3",
    )
    if end.has("s_p"):
        s_p = end.take(work, "s_p")
        work.check("least pitch", s_min, s_p, "9.6.1", kind="detailing")
        work.check("greatest pitch", s_p, s_max, "9.6.3", kind="detailing")
    if end.has("s_g"):
        s_g = end.take(work, "s_g")
        apart = s_g
        if end.choice("pattern") == "staggered":
            apart = work.step(detailing.diagonal, end.kept_line("s"), s_g)
        work.check("least distance between lines", s_min, apart, "9.6.1", kind="detailing")
        work.check("greatest distance between lines", s_g, s_max, "9.6.3", kind="detailing")
    _edges(work, end, d_f, t, t_p)


def _edges(work: Working, end: Inputs, d_f: Entry, t: Entry, t_p: Entry) -> None:
    cut = end.choice("edge_kind")
    e_min = _least_edge(work, cut, d_f, "k_e", "e_min")
    limit = work.fixed("e_lim", detailing.EDGE_LIMIT, "9.6.4", note="limit of the clause")
    title = "greatest edge distance"
    e_max = work.least(
        "e_max", work.step(detailing.twelve_plies, t), limit, title=title, clause="9.6.4"
    )
    e_1 = end.take(work, "e_1")
    work.check("least end distance, member", e_min, e_1, "Table 9.6.2", kind="detailing")
    work.check("greatest end distance, member", e_1, e_max, "9.6.4", kind="detailing")
    side = end.choice("side_edge")
    if side != "none":
        e_2 = end.kept_line("e_2")
        e_min2 = e_min if side == cut else _least_edge(work, side, d_f, "k_e2", "e_min2")
        work.check("least edge distance, member", e_min2, e_2, "Table 9.6.2", kind="detailing")
        work.check("greatest edge distance, member", e_2, e_max, "9.6.4", kind="detailing")

    e_maxp = work.least(
        "e_maxp",
        work.step(detailing.twelve_plies, t_p, gives="e_12p", title="12 times the gusset"),
        limit,
        title=title + ", gusset",
        clause="9.6.4",
    )
    e_p = end.take(work, "e_p")
    work.check("least end distance, gusset", e_min, e_p, "Table 9.6.2", kind="detailing")
    work.check("greatest end distance, gusset", e_p, e_maxp, "9.6.4", kind="detailing")
    if end.has("e_s"):
        e_s = end.take(work, "e_s")
        work.check("least edge distance, gusset", e_min, e_s, "Table 9.6.2", kind="detailing")
        work.check("greatest edge distance, gusset", e_s, e_maxp, "9.6.4", kind="detailing")


def _least_edge(work: Working, cut: str, d_f: Entry, factor: str, gives: str) -> Entry:
    k_e = work.fixed(
        factor,
        detailing.EDGE_FACTORS[cut],
        "Table 9.6.2",
        note=detailing.EDGE_WORDS[cut],
        source="Table 9.6.2, from memory, sure",
    )
    return work.step(detailing.least_edge, k_e, d_f, gives=gives)


_SIDES: dict[tuple[str, bool], tuple[Formula, tuple[str, ...]]] = {
    ("heel", False): (detailing.edge_from_heel, ("b", "g")),
    ("heel", True): (detailing.edge_from_heel_two, ("b", "g", "s_g")),
    ("middle", False): (detailing.edge_middle, ("b",)),
    ("middle", True): (detailing.edge_middle_two, ("b", "s_g")),
}


def _side_distance(work: Working, end: Inputs) -> Entry:
    formula, names = _SIDES[end.choice("lines_from"), end.has("s_g")]
    return work.step(formula, *(end.take(work, name) for name in names))
