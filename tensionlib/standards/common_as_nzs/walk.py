"""The walk of AS 4100 and NZS 3404 for a tension member: section 7, then each end connection."""

from __future__ import annotations

from dataclasses import dataclass

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import bolts, detailing, hole_sizes, rods, tension
from tensionlib.standards.common_as_nzs.bolts_in_shear import joint_length
from tensionlib.standards.common_as_nzs.rules import Rules
from tensionlib.standards.common_as_nzs.walk_bending import bending_checks, service_lines
from tensionlib.standards.common_as_nzs.walk_bolted import bolted_end
from tensionlib.standards.common_as_nzs.walk_fastening import fastening
from tensionlib.standards.common_as_nzs.walk_hanger import hanger_checks
from tensionlib.standards.common_as_nzs.walk_pattern import (
    force_at_chain,
    pattern_deduction,
    pattern_end,
)
from tensionlib.standards.common_as_nzs.walk_pinned import eye_net_area, pinned_end
from tensionlib.standards.common_as_nzs.walk_rod import rod_end, thread_area
from tensionlib.standards.common_as_nzs.walk_welded import (
    shear_lag_of_slot,
    shorter_run,
    welded_end,
)


@dataclass(frozen=True)
class _Member:
    """The member's lines that the ends read."""

    force: Entry
    A_g: Entry
    f_u: Entry
    phi: Entry
    inputs: Inputs
    rules: Rules


def design(
    rules: Rules, work: Working, member: Inputs, ends: tuple[Inputs, ...], force: Entry
) -> None:
    """Write the whole calculation: the member once, then each distinct end.

    Parameters
    ----------
    rules : Rules
        The standard's own answers.
    work : Working
    member : Inputs
        Numbers L, A_g, t_y and, where known, r_min and d; tables f_y and f_u.
    ends : tuple of Inputs
        One (the same end twice) or two.
    force : Entry
        The design tension force N*, a line of `work`.
    """
    with work.part("Member"):
        A_g = member.take(work, "A_g")
        t_y = member.take(work, "t_y")
        f_y = member.read(work, "f_y", t_y)
        f_u = member.read(work, "f_u", t_y)
        phi = work.fixed(
            "phi", rules.factors.member, rules.factors.clause, note="member in tension"
        )
        N_ty = work.step(tension.gross_yielding, A_g, f_y)
        phiN_ty = work.step(tension.design_gross_yielding, phi, N_ty)
        work.check("gross section yield", force, phiN_ty, "7.1, 7.2")
        _slenderness(work, member)
        N_os = _overstrength(rules, work, member, N_ty)

    lines = _Member(force, A_g, f_u, phi, member, rules)
    capacities = [phiN_ty]
    for end in ends:
        with work.part(end.choice("label") + "Net section"):
            fracture = _net_section(work, lines, end)
            if fracture is not None:
                capacities.append(fracture)

    with work.part("Design action on the connection"):
        phiN_t = work.least(
            "phiN_t", *capacities, title="design capacity of the member", clause="7.1"
        )
        own_capacity = any(
            end.choice("kind") == "rod" and end.choice("braced") == "yes" for end in ends
        )
        N_min = work.step(rods.rod_action if own_capacity else bolts.minimum_action, phiN_t)
        actions = [force, N_min] if N_os is None else [force, N_min, N_os]
        N_c = work.greatest(
            "N_star_c",
            *actions,
            title="design action on the connection",
            clause=bolts.MINIMUM_ACTION_CLAUSE,
        )

        if N_os is not None and len(capacities) > 1:
            fracture = work.least(
                "phiN_tu", *capacities[1:], title="design capacity, net fracture", clause="7.1"
            )
            work.check("net section at the brace's overstrength", N_os, fracture, "7.2")
    bending_checks(rules, work, member, force, phiN_t, f_y)
    service_lines(work, member)
    for end in ends:
        if end.choice("kind") == "bolted":
            bolted_end(rules, work, end, N_c, f_y, f_u)
        elif end.choice("kind") == "bolted pattern":
            pattern_end(rules, work, end, N_c, f_y, f_u)
        elif end.choice("kind") == "pinned":
            pinned_end(rules, work, end, N_c, f_y, f_u)
        elif end.choice("kind") == "rod":
            rod_end(rules, work, end, N_c, f_u)
        else:
            welded_end(rules, work, end, N_c)
        hanger_checks(rules, work, end, N_c)
        if end.choice("kind") in ("bolted", "bolted pattern"):
            fastening(work, end)
    work.leaves_out(*rules.not_checked)


def _overstrength(rules: Rules, work: Working, member: Inputs, N_ty: Entry) -> Entry | None:
    """The action of a brace that yields in an earthquake, where one is stated."""
    if member.choice("category") == "none":
        return None
    if rules.overstrength is None:
        work.not_covered(
            "overstrength of the brace",
            f"{rules.name} leaves earthquake design to the loading standard: give the connection's"
            " design action as the force",
            "",
        )
        return None
    return rules.overstrength(work, member, N_ty)


def _slenderness(work: Working, member: Inputs) -> None:
    if not member.has("r_min"):
        work.note("No radius of gyration is stated for the section: no advice on slenderness.")
        return
    L = member.take(work, "L")
    slenderness = work.step(tension.slenderness, L, member.take(work, "r_min"))
    limit = work.fixed(
        "lambda_max",
        detailing.ADVISED_SLENDERNESS,
        "practice",
        note="advice for members in tension; common practice, no source",
    )
    work.check("slenderness", slenderness, limit, "practice", kind="advice")


def _net_section(work: Working, member: _Member, end: Inputs) -> Entry | None:
    """Net area, k_t and the check; gives the design capacity, or None where not covered."""
    own = {"pinned": eye_net_area, "rod": thread_area}.get(end.choice("kind"))
    A_d = None if own is not None else _deduction(work, end)
    if own is not None:
        A_n = own(work, end)
    elif A_d is None:
        work.note("Welded end without holes: the net area is the gross area.", "9.1.10")
        A_n = member.A_g
    else:
        A_n = work.step(tension.net_area, member.A_g, A_d)
    k_t = _factor(work, member, end)
    if k_t is None:
        return None
    N_tu = work.step(tension.net_fracture, k_t, A_n, member.f_u)
    phiN_tu = work.step(tension.design_net_fracture, member.phi, N_tu)
    force = force_at_chain(work, end, member.force)
    work.check("net section rupture", force, phiN_tu, "7.1, 7.2")
    return phiN_tu


def _deduction(work: Working, end: Inputs) -> Entry | None:
    """The area lost to holes or slots, or None where there are none."""
    if end.choice("to") == "slot":
        return work.step(
            tension.deduction_slots,
            *(end.take(work, name) for name in ("n_s", "t", "t_p", "c_s")),
        )
    if end.choice("kind") in ("welded", "welded runs"):
        return None
    if end.choice("kind") == "bolted pattern":
        return pattern_deduction(work, end)
    d_f = end.take(work, "d_f")
    c_h = (
        end.take(work, "c_h")
        if end.has("c_h")
        else work.upto(hole_sizes.CLEARANCES, hole_sizes.STANDARD, "c_h", d_f, clause="14.3.5.2")
    )
    d_h = work.step(tension.hole_diameter, d_f, c_h)
    end.keep("d_h", d_h)
    n_e, t = end.take(work, "n_e"), end.take(work, "t")
    if end.choice("pattern") != "staggered":
        return work.step(tension.deduction_straight, n_e, end.take(work, "n_l"), d_h, t)
    s = _zigzag_step(work, end)
    one = work.step(tension.deduction_one_hole, n_e, d_h, t)
    both = work.step(tension.deduction_zigzag, n_e, d_h, t, s, end.take(work, "s_g"))
    return work.greatest(
        "A_d", one, both, title="area deducted: the greater of the lines", clause="9.1.10"
    )


def _zigzag_step(work: Working, end: Inputs) -> Entry:
    s_2 = end.take(work, "s_2")
    if not end.has("s_p"):
        return end.keep("s", s_2)
    s_3 = work.step(tension.stagger_to_next, end.take(work, "s_p"), s_2)
    title = "smaller stagger of the zigzag's steps"
    return end.keep("s", work.least("s", s_2, s_3, title=title, clause="9.1.10"))


def connection_case(end: Inputs) -> str:
    """The row of `tension.CASES` for this end, or "" where the standard's table has none."""
    shape, to = end.choice("shape"), end.choice("to")
    if end.choice("kind") == "bolted pattern" and end.choice("all_elements") == "yes":
        return "all elements"
    if shape in ("double angle", "double channel"):
        return "back to back"
    if shape == "angle":
        return "angle by short leg" if to == "short leg" else "angle by one leg"
    if to == "both flanges":
        return "both flanges"
    return {
        ("channel", "web"): "channel by web",
        ("tee", "flange"): "tee by flange",
        ("flat", "plate"): "concentric",
        ("round", "bar"): "concentric",
        ("round", "rod"): "concentric",
    }.get((shape, to), "")


def _factor(work: Working, member: _Member, end: Inputs) -> Entry | None:
    """The line for k_t, or None where the standard does not cover the case."""
    symbol = member.rules.k_t
    if end.has("k_t"):
        return end.take(work, "k_t", symbol)
    if end.choice("to") == "slot" and end.choice("shear_lag") == "by length":
        return shear_lag_of_slot(work, end, symbol)
    key = connection_case(end)
    why = (
        f"Table 7.3.2 has no row for this section ({end.choice('shape')}) connected by its"
        f" {end.choice('to')}: state k_t with the reason for it, or connect another element"
    )
    if key == "both flanges" and not _covers_depth(work, member.inputs, end):
        key = ""
        why = "Table 7.3.2 asks for a joint at least as long as the section is deep"
    if not key:
        work.not_covered("net section rupture", why, "7.3.2")
        return None
    case = tension.CASES[key]
    return work.fixed(
        symbol, case.k_t, case.clause, note=case.words, source=f"{case.clause}, {case.sure}"
    )


def _covers_depth(work: Working, member: Inputs, end: Inputs) -> bool:
    d = member.take(work, "d")
    if end.choice("kind") in ("bolted", "bolted pattern"):
        length = joint_length(work, end)
        return length is not None and work.holds(tension.joint_covers_depth, length, d)
    return work.holds(tension.weld_covers_depth, shorter_run(work, end), d)
