"""The walk of AS 4100 and NZS 3404 for a bolted end with any pattern of holes.

The search of the layers above has chosen the chain of holes, the tear-out block and the bolt that
each formula is written for; this walk writes the clause's own formulas on them.
"""

from __future__ import annotations

from functools import cache

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.symbols import Symbol
from tensionlib.calculation.working import Working
from tensionlib.quantities import AREA, LENGTH
from tensionlib.standards.common_as_nzs import block, bolts, detailing, gusset, pattern
from tensionlib.standards.common_as_nzs.bolts_in_shear import bolt_capacity, slip_check
from tensionlib.standards.common_as_nzs.rules import Rules
from tensionlib.standards.common_as_nzs.walk_gusset import check_width
from tensionlib.standards.common_as_nzs.walk_gusset_itself import gusset_itself


@cache
def _area(k: int) -> Symbol:
    return Symbol(f"A_d{k}", f"A_{{d{k}}}", AREA, f"area lost to hole {k} of the chain")


@cache
def _hole(k: int) -> Symbol:
    return Symbol(f"d_h{k}", f"d_{{h{k}}}", LENGTH, f"hole {k} of the chain, across the force")


@cache
def _step(k: int) -> tuple[Symbol, Symbol]:
    return (
        Symbol(f"s_z{k}", f"s_{{z{k}}}", LENGTH, f"step to hole {k} of the chain, along the force"),
        Symbol(
            f"g_z{k}", f"g_{{z{k}}}", LENGTH, f"step to hole {k} of the chain, across the force"
        ),
    )


def chain_area(work: Working, hops: tuple[Inputs, ...], usual: Entry) -> Entry:
    """Area that a chain of holes takes from one component, hole by hole.

    `usual` is the thickness at a hole that has none of its own.
    """
    lost: Entry | None = None
    for k, hop in enumerate(hops, start=1):
        d_h = hop.take(work, "d_h", _hole(k))
        t = hop.take(work, "t") if hop.has("t") else usual
        note = f"hole {hop.choice('mark')}"
        if lost is None:
            lost = work.step(pattern.first_hole, d_h, t, gives=_area(k), note=note)
        elif hop.has("s"):
            s, g = (hop.take(work, n, x) for n, x in zip(("s", "g"), _step(k), strict=True))
            t_s = hop.take(work, "t_s") if hop.has("t_s") else t
            lost = work.step(
                pattern.next_hole_staggered, lost, d_h, t, s, g, t_s, gives=_area(k), note=note
            )
        else:
            lost = work.step(pattern.next_hole, lost, d_h, t, gives=_area(k), note=note)
    assert lost is not None
    return lost


def pattern_deduction(work: Working, end: Inputs) -> Entry:
    """Area deducted along the chain found, over all components."""
    work.note(
        "Every chain of holes across the section was tried; the one that leaves least is"
        f" {end.choice('chain')}.",
        "9.1.10",
    )
    lost = chain_area(work, end.parts["chain"], end.take(work, "t"))
    return work.step(pattern.all_components, end.take(work, "n_c"), lost)


def force_at_chain(work: Working, end: Inputs, force: Entry) -> Entry:
    """The force on the net section: less what bolts behind the chain took, where credited."""
    if not end.has("n_k"):
        return force
    work.note(
        "Credit taken, as asked for: the bolts between the chain and the member's body have"
        " already taken their equal shares; common practice, no source."
    )
    return work.step(pattern.force_left, force, end.take(work, "n_k"), end.take(work, "n_b"))


def pattern_end(
    rules: Rules, work: Working, end: Inputs, N_c: Entry, f_y: Entry, f_u: Entry
) -> None:
    """Write the checks of a bolted end with any pattern of holes."""
    label = end.choice("label")
    with work.part(label + "Bolts"):
        V_b = _bolt_force(work, end, N_c, "V_star_b", end.parts["most loaded"][0])
        capacity = work.step(
            pattern.one_bolt, *bolt_capacity(rules, work, end), title="design capacity of a bolt"
        )
        work.check("bolt shear, most loaded bolt", V_b, capacity, "9.3.2.1")
        most = end.parts["most loaded"][0]
        elastic = end.choice("share") == "elastic"
        slip_check(
            rules,
            work,
            end,
            (lambda N: _bolt_force(work, end, N, "V_star_ser", most)) if elastic else None,
        )
        if end.choice("play") != "none":
            work.not_covered(
                "holes with play along the force",
                "oversize holes and slots along the force in bolts that bear are not offered"
                f" ({end.choice('play')}): use a friction joint (TF) or standard holes",
                "14.3.5.2",
            )
    grips = end.parts["grips"]
    for grip in grips:
        title = label + "Member at the bolts" + grip.choice("where")
        with work.part(title):
            _plies(rules, work, end, grip, N_c, V_b, f_u)
            _blocks(rules, work, end, grip, N_c, f_y, f_u)
    for grip in grips:
        plates = grip.parts["plate"][0]
        with work.part(label + end.choice("plate") + grip.choice("where")):
            t_p = end.take(work, "t_p")
            f_yp, f_up = end.read(work, "f_yp", t_p), end.read(work, "f_up", t_p)
            N_m = _element_force(work, end, grip, N_c)
            _plies(rules, work, end, plates, N_c, V_b, f_up)
            _gusset_width(rules, work, end, plates, N_m, f_yp, f_up)
            gusset_itself(rules, work, end, N_c, f_yp)
            _blocks(rules, work, end, plates, N_c, f_yp, f_up)
    with work.part(label + "Bolt distances"):
        _distances(work, end)
    if len(grips) > 1:
        work.assume(
            f"{label}the bolts of every element are taken to plates like the gusset, by lugs or"
            " plates that are designed apart, and all bolts share the force equally"
        )


def _bolt_force(work: Working, end: Inputs, N_c: Entry, gives: str, bolt: Inputs) -> Entry:
    """Force on one bolt: the equal share, or that of the elastic vectors."""
    n_b = end.take(work, "n_b")
    if end.choice("share") == "equal":
        known = end.kept("V_star_b")
        if known is not None:
            return known
        return end.keep("V_star_b", work.step(pattern.equal_share, N_c, n_b))
    e, I_b = end.take(work, "e_b"), end.take(work, "I_b")
    note = f"bolt {bolt.choice('mark')}"
    V_x = work.step(pattern.share_along, N_c, n_b, e, bolt.take(work, "y_b"), I_b, note=note)
    V_y = work.step(pattern.share_across, N_c, e, bolt.take(work, "x_b"), I_b, note=note)
    return work.step(pattern.resultant, V_x, V_y, gives=gives, note=note)


def _plies(
    rules: Rules,
    work: Working,
    end: Inputs,
    ply: Inputs,
    N_c: Entry,
    V_b: Entry,
    f_u: Entry,
) -> None:
    """Bearing at the most loaded bolt and tear-out at the worst one, in the plies of a part."""
    at_gusset = ply.choice("part") == "gusset"
    phi = work.fixed("phi", rules.factors.ply, rules.factors.clause, note="ply in bearing")
    d_f, n_e, t = end.take(work, "d_f"), ply.take(work, "n_e"), _thickness(work, end, ply)
    bearing = rules.bearing(
        work,
        end,
        d_f,
        t,
        f_u,
        "V_pb" if at_gusset else "V_bb",
        "bearing of the gusset at a bolt" if at_gusset else "bearing of the ply at a bolt",
    )
    capacity = work.step(
        pattern.plies_at_bolt, phi, n_e, bearing, gives="phiV_pb" if at_gusset else "phiV_bb"
    )
    work.check("ply bearing, most loaded bolt", V_b, capacity, "9.3.2.4")
    worst = ply.parts["tear-out"][0]
    note = f"bolt {worst.choice('mark')}: {worst.choice('to')}"
    l_c = worst.take(work, "l_c", "l_cp" if at_gusset else "l_c")
    a_e = work.step(pattern.clear, l_c, d_f, gives="a_p" if at_gusset else "a_e", note=note)
    tear_out = work.step(bolts.ply_tear_out, a_e, t, f_u, gives="V_pt" if at_gusset else "V_bt")
    capacity = work.step(
        pattern.plies_at_bolt,
        phi,
        n_e,
        tear_out,
        gives="phiV_pt" if at_gusset else "phiV_bt",
    )
    force = V_b
    if end.choice("share") == "elastic":
        force = _bolt_force(work, end, N_c, "V_star_tp" if at_gusset else "V_star_t", worst)
    work.check("ply tear-out, worst bolt", force, capacity, "9.3.2.4")


def _thickness(work: Working, end: Inputs, part: Inputs) -> Entry:
    """Thickness of a part: its own where that is not the connected element's or the gusset's."""
    if part.has("t"):
        return part.take(work, "t")
    return end.take(work, "t_p" if part.choice("part") == "gusset" else "t")


def _element_force(work: Working, end: Inputs, grip: Inputs, N_c: Entry) -> Entry:
    if len(end.parts["grips"]) == 1:
        return N_c
    return work.step(pattern.element_share, N_c, grip.take(work, "n_m"), end.take(work, "n_b"))


def _blocks(
    rules: Rules,
    work: Working,
    end: Inputs,
    part: Inputs,
    N_c: Entry,
    f_y: Entry,
    f_u: Entry,
) -> None:
    """The tear-out block found for a part, or a word that there is none."""
    rule, clause = rules.block, rules.block.clause
    found = part.parts["block"]
    if not found:
        work.note("No tear-out block: no shear plane meets a width in tension.", clause)
        return
    (shape,) = found
    suffix = "p" if part.choice("part") == "gusset" else ""
    work.note(rule.note, clause)
    work.note(
        f"Every block of the pattern was tried; the one that governs runs {shape.choice('words')}.",
        clause,
    )
    n_e, t = part.take(work, "n_e"), _thickness(work, end, part)
    L_gv, h_v, b_gt, h_t = (shape.take(work, n) for n in ("L_gv", "h_v", "b_gt", "h_t"))
    A_gv = work.step(pattern.gross_shear, n_e, L_gv, t, gives="A_gv" + suffix, clause=clause)
    A_nv = work.step(pattern.net_shear, n_e, L_gv, h_v, t, gives="A_nv" + suffix, clause=clause)
    if shape.has("c_t"):
        c_t = shape.take(work, "c_t")
        A_nt = work.step(
            pattern.net_tension_staggered,
            *(n_e, b_gt, h_t, c_t, t),
            gives="A_nt" + suffix,
            clause=clause,
        )
    else:
        A_nt = work.step(
            pattern.net_tension, n_e, b_gt, h_t, t, gives="A_nt" + suffix, clause=clause
        )
    uniform = end.choice("block_tension") == "uniform"
    k_bs = work.fixed(
        "k_bs",
        block.UNIFORM if uniform else block.NON_UNIFORM,
        clause,
        note="tension taken as uniform" if uniform else "tension not uniform, as stated",
    )
    N_bs = work.step(
        block.block_shear, f_u, A_nv, f_y, A_gv, k_bs, A_nt, gives="N_bs" + suffix, clause=clause
    )
    phi = work.fixed("phi", rule.phi, clause, note="block shear", source=rule.known)
    capacity = work.step(block.design_block, phi, N_bs, gives="phiN_bs" + suffix, clause=clause)
    force = N_c
    if shape.has("n_sb"):
        force = work.step(
            pattern.block_share,
            N_c,
            shape.take(work, "n_sb"),
            end.take(work, "n_b"),
            note=f"bolts {shape.choice('separated')}",
        )
    work.check("block shear", force, capacity, clause)


def _gusset_width(
    rules: Rules,
    work: Working,
    end: Inputs,
    plate: Inputs,
    N_m: Entry,
    f_yp: Entry,
    f_up: Entry,
) -> None:
    b_d = None
    if plate.has("s_o"):
        b_d = work.step(
            pattern.spread, *(plate.take(work, name) for name in ("s_o", "L_o1", "L_o2"))
        )
    b_e = check_width(work, end, plate, b_d)
    if b_e is None:
        return
    phi = work.fixed(
        "phi",
        rules.factors.component,
        rules.factors.clause,
        note="connection component other than bolt, pin or weld",
    )
    n_g, t_p = plate.take(work, "n_e"), end.take(work, "t_p")
    A_gp = end.keep("A_gp", work.step(gusset.gross_area, n_g, b_e, t_p))
    phiN_py = work.step(gusset.design_yielding, phi, work.step(gusset.yielding, A_gp, f_yp))
    where = "on the width to which the force spreads"
    work.check("yield", N_m, phiN_py, "7.2", note=where)
    work.note(f"The chain that leaves least of the gusset is {plate.choice('chain')}.", "9.1.10")
    lost = chain_area(work, plate.parts["chain"], t_p)
    A_np = work.step(pattern.gusset_net, n_g, b_e, t_p, lost)
    phiN_pu = work.step(gusset.design_fracture, phi, work.step(gusset.fracture, A_np, f_up))
    work.check("rupture", N_m, phiN_pu, "7.2", note=where)


# Distances --------------------------------------------------------------------------------


def _distances(work: Working, end: Inputs) -> None:
    """Each limit against the bolt that comes nearest to it."""
    d_f, t_p = end.take(work, "d_f"), end.take(work, "t_p")
    t_thin = work.least("t_thin", end.take(work, "t"), t_p, title="thinner ply")
    limit = work.fixed("s_lim", detailing.PITCH_LIMIT, "9.6.3", note="limit of the clause")
    if end.has("s_near"):
        s_min = work.step(detailing.least_pitch, d_f)
        work.check(
            "least distance between bolts",
            s_min,
            end.take(work, "s_near", _near()),
            "9.6.1",
            kind="detailing",
        )
        s_max = work.least(
            "s_max",
            work.step(detailing.fifteen_plies, t_thin),
            limit,
            title="greatest distance between bolts",
            clause="9.6.3",
        )
        work.check(
            "greatest distance between bolts",
            end.take(work, "s_far", _far()),
            s_max,
            "9.6.3",
            kind="detailing",
        )
    for edge in end.parts["edges"]:
        _edge(work, end, edge, d_f)


@cache
def _near() -> Symbol:
    return Symbol("s_n", "s_{n}", LENGTH, "nearest two bolts, centre to centre")


@cache
def _far() -> Symbol:
    return Symbol("s_f", "s_{f}", LENGTH, "bolt farthest from its nearest neighbour")


@cache
def _edge_symbols(k: int, of: str) -> tuple[Symbol, ...]:
    return (
        Symbol(f"e_d{k}", f"e_{{d{k}}}", LENGTH, f"distance: {of}"),
        Symbol(f"e_min_{k}", f"e_{{\\min,{k}}}", LENGTH, f"least allowed: {of}"),
        Symbol(f"e_max_{k}", f"e_{{\\max,{k}}}", LENGTH, f"greatest allowed: {of}"),
        Symbol(f"e_12_{k}", f"e_{{12,{k}}}", LENGTH, f"12 times the ply: {of}"),
    )


def _edge(work: Working, end: Inputs, edge: Inputs, d_f: Entry) -> None:
    number, of = int(edge.choice("number")), edge.choice("of")
    distance, least, most, twelve = _edge_symbols(number, of)
    cut = edge.choice("cut")
    k_e = work.fixed(
        "k_e",
        detailing.EDGE_FACTORS[cut],
        "Table 9.6.2",
        note=detailing.EDGE_WORDS[cut],
        source="Table 9.6.2, from memory, sure",
    )
    e_min = work.step(detailing.least_edge, k_e, d_f, gives=least)
    e = edge.take(work, "e", distance)
    work.check(f"least edge distance, {of}", e_min, e, "Table 9.6.2", kind="detailing")
    limit = work.fixed("e_lim", detailing.EDGE_LIMIT, "9.6.4", note="limit of the clause")
    e_max = work.least(
        most,
        work.step(detailing.twelve_plies, _thickness(work, end, edge), gives=twelve),
        limit,
        title="greatest edge distance",
        clause="9.6.4",
    )
    work.check(
        f"greatest edge distance, {of}",
        e,
        e_max,
        "9.6.4",
        kind="detailing",
    )
