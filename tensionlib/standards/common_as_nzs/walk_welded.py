"""The walk of AS 4100 and NZS 3404 for a welded end: welds, gusset, weld limits."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.symbols import Symbol
from tensionlib.calculation.tables import Band, ThresholdTable
from tensionlib.calculation.working import Working
from tensionlib.quantities import LENGTH
from tensionlib.standards.common_as_nzs import gusset, welds
from tensionlib.standards.common_as_nzs.rules import Factors, Rules
from tensionlib.standards.common_as_nzs.walk_gusset import check_gusset
from tensionlib.standards.common_as_nzs.walk_gusset_itself import gusset_itself

LEGS = ThresholdTable(
    "least leg of a fillet weld",
    "Table 9.7.3.2, from memory, sure",
    {"fillet weld": tuple(Band(limit, True, value) for limit, value in welds.LEAST_LEGS)},
)
WIDTH = Symbol("b_r", "b_{r}", LENGTH, "width across the force from outer run to outer run")
LARGEST = Symbol("t_w2", "t_{w2}", LENGTH, "largest leg size of the runs")
LAP = Symbol("l_lap", r"l_{\mathrm{lap}}", LENGTH, "least lap of the parts")
LEAST_LAP = Symbol("l_lap0", r"l_{\mathrm{lap},0}", LENGTH, "shortest lap of any parts")
SHORTEST = Symbol("l_r", "l_{r}", LENGTH, "shortest run of weld")
LAP_CLAUSE = "Table 9.7.3.10(2)"


def welded_end(rules: Rules, work: Working, end: Inputs, N_c: Entry) -> None:
    """Write the checks of a welded end for the design action on the connection."""
    label, runs = end.choice("label"), end.choice("kind") == "welded runs"
    with work.part(label + "Welds"):
        if runs:
            _elastic(rules.factors, work, end, N_c)
        else:
            _welds(rules.factors, work, end, N_c)
    with work.part(label + "Gusset"):
        t_p = end.take(work, "t_p")
        f_yp, f_up = end.read(work, "f_yp", t_p), end.read(work, "f_up", t_p)
        b = end.take(work, "b_r", WIDTH) if runs else end.take(work, "b")
        b_d = work.step(gusset.spread_welds, b, shorter_run(work, end))
        check_gusset(rules.factors, work, end, N_c, b_d, f_yp, f_up)
        gusset_itself(rules, work, end, N_c, f_yp)
    with work.part(label + "Weld limits"):
        _limits(work, end)


def shear_lag_of_slot(work: Working, end: Inputs, symbol: str) -> Entry | None:
    """The correction factor of a slotted tube by the length of its welds, as asked for.

    AISC 360-16 Table D3.1, cases 5 and 6, from memory: no rule of AS 4100 or NZS 3404.
    """
    work.note(
        "Table 7.3.2 has no row for a slotted tube; as asked for, its factor is 1 - x̄/l of"
        " AISC 360-16 Table D3.1, cases 5 and 6, from memory.",
        "practice",
    )
    height = end.take(work, "h_s", welds.WELDS["h_s"])
    length = shorter_run(work, end)
    if not work.holds(welds.as_long_as_tube, length, height, yes="the factor holds"):
        work.not_covered(
            "net section rupture",
            "the welds are shorter than the tube is high: the factor 1 - x̄/l does not hold",
            "practice",
        )
        return None
    return work.step(
        welds.shear_lag, end.take(work, "x_bar", welds.WELDS["x_bar"]), length, gives=symbol
    )


def shorter_run(work: Working, end: Inputs) -> Entry:
    """The shorter of the two runs along the force, written once."""
    return _run(work, end, "l_min")


def _run(work: Working, end: Inputs, which: str) -> Entry:
    known = end.kept(which)
    if known is not None:
        return known
    if end.choice("kind") == "welded runs":
        return end.keep(which, end.take(work, which))
    runs = end.take(work, "l_1"), end.take(work, "l_2")
    pick, title = (work.least, "shorter run") if which == "l_min" else (work.greatest, "longer run")
    return end.keep(which, pick(which, *runs, title=title))


def _welds(factors: Factors, work: Working, end: Inputs, N_c: Entry) -> None:
    quality = end.choice("quality")
    phi = work.fixed(
        "phi",
        factors.fillet[quality],
        factors.clause,
        note=f"fillet weld of quality {quality}",
    )
    t_t = work.step(welds.throat, end.take(work, "t_w"))
    l_1, l_2 = end.take(work, "l_1"), end.take(work, "l_2")
    if end.choice("to") in ("slot", "bar"):
        l_w = work.step(welds.length_four_runs, l_1, l_2)
    elif end.has("l_t"):
        l_w = work.step(
            welds.length_three_runs, end.take(work, "n_e"), l_1, l_2, end.take(work, "l_t")
        )
    else:
        l_w = work.step(welds.length_two_runs, end.take(work, "n_e"), l_1, l_2)
    k_r = _lap_factor(work, end)
    v_w = work.step(welds.fillet, end.take(work, "f_uw"), t_t, k_r)
    capacity = work.step(welds.design_fillet, phi, v_w, l_w)
    work.check("weld", N_c, capacity, "9.7.3.10")
    work.assume(
        f"{end.choice('label')}every run of weld carries the same force per unit length; the weld's"
        " centroid may stand off the member's line (accepted for static loads, common practice)"
    )
    if end.choice("to") == "bar":
        work.assume(
            f"{end.choice('label')}the fillets between the round bar and the gusset have the throat"
            " of a right-angled fillet of the stated leg, which the weld procedure is to show"
        )


def _elastic(factors: Factors, work: Working, end: Inputs, N_c: Entry) -> None:
    """Any runs of weld: the stress at the worst point of the group by elastic vectors."""
    quality = end.choice("quality")

    def take(name: str) -> Entry:
        return end.take(work, name, welds.WELDS[name])

    phi = work.fixed(
        "phi", factors.fillet[quality], factors.clause, note=f"fillet weld of quality {quality}"
    )
    n_e = end.take(work, "n_e")
    A_w = work.step(welds.throats_of_plies, n_e, take("A_wn"))
    I_w = work.step(welds.inertia_of_plies, n_e, take("I_wn"))
    e = take("e_w")
    note = f"end of run {end.choice('worst')}"
    along = work.step(welds.throat_stress_along, N_c, A_w, e, take("y_w"), I_w, note=note)
    across = work.step(welds.throat_stress_across, N_c, e, take("x_w"), I_w, note=note)
    stress = work.step(welds.throat_stress, along, across, note=note)
    strength = work.step(welds.throat_strength, phi, end.take(work, "f_uw"), _lap_factor(work, end))
    work.check("weld, most stressed point", stress, strength, "9.7.3.10")


def _lap_factor(work: Working, end: Inputs) -> Entry:
    longest = _run(work, end, "l_max")
    if work.holds(welds.short_lap, longest, yes="no reduction"):
        return work.fixed("k_r", 1.0, LAP_CLAUSE, note="short lap")
    if work.holds(welds.middle_lap, longest, yes="reduction by length"):
        return work.step(welds.long_lap_factor, longest)
    return work.fixed("k_r", 0.62, LAP_CLAUSE, note="longest laps")


def _limits(work: Working, end: Inputs) -> None:
    t, t_p = end.take(work, "t"), end.take(work, "t_p")
    t_thick = work.greatest("t_thick", t, t_p, title="thicker of the parts joined")
    least = work.upto(LEGS, "fillet weld", "t_wmin", t_thick, clause="Table 9.7.3.2")
    runs = end.choice("kind") == "welded runs"
    # Of runs with legs of different sizes the smallest and the largest are judged.
    t_w = end.take(work, "t_w")
    largest = end.take(work, "t_w2", LARGEST) if end.has("t_w2") else t_w
    work.check("least weld size", least, t_w, "Table 9.7.3.2", kind="detailing")
    if end.choice("to") not in ("slot", "bar"):
        thin = work.holds(welds.thin_edge, t, yes="as thick as the edge", no="1 mm less")
        most = work.step(welds.leg_limit_thin if thin else welds.leg_limit, t)
        work.check("greatest weld size", largest, most, "9.7.3.3", kind="detailing")
    shortest = work.step(welds.least_length, largest)
    least_run = end.take(work, "l_r", SHORTEST) if runs else shorter_run(work, end)
    work.check("least weld length", shortest, least_run, "9.7.3.5", kind="detailing")
    if runs:
        return
    if end.choice("to") not in ("slot", "bar"):
        t_thin = work.least("t_thin", t, t_p, title="thinner of the parts joined")
        lap = work.greatest(
            LAP,
            work.step(welds.five_plies, t_thin),
            work.fixed(LEAST_LAP, welds.SHORTEST_LAP, "practice", note="no lap is shorter"),
            title="least lap",
            clause="practice",
        )
        work.check(
            "lap",
            lap,
            shorter_run(work, end),
            "practice",
            kind="advice",
            note="AISC 360-16 J2.2b, from memory; returns round the ends do not count",
        )
    if not end.has("l_t") and end.choice("to") not in ("slot", "bar"):
        work.check(
            "weld length over the width between runs",
            end.take(work, "b"),
            shorter_run(work, end),
            "practice",
            kind="advice",
            note="side welds alone: each at least as long as the distance between them;"
            " common practice, no source",
        )
