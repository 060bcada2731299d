"""The walk of AS 4100 and NZS 3404 for a threaded rod: thread, fork, coupling, lug."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import rods
from tensionlib.standards.common_as_nzs.rods import RODS
from tensionlib.standards.common_as_nzs.rules import Rules
from tensionlib.standards.common_as_nzs.walk_pinned import pin_plate


def _take(work: Working, end: Inputs, name: str) -> Entry:
    return end.take(work, name, RODS[name])


def thread_area(work: Working, end: Inputs) -> Entry:
    """Net area of the rod: the tensile stress area A_s of its thread, a number of the end."""
    work.note("The net area of a threaded rod is the tensile stress area of its thread.", "7.2")
    return end.take(work, "A_s")


def rod_end(rules: Rules, work: Working, end: Inputs, N_c: Entry, f_u: Entry) -> None:
    """Write the checks of a threaded rod's end for the design action on the connection.

    Takes of the end the numbers A_s, R_f, t_p, d_p, d_hp and, with a sleeve, d_th; the choices
    "label", "certified" and "earthquake"; the tables f_yp and f_up; n_f, w_e, e_e of its part
    "fork", which is the lug; d_sl and l_en and the tables f_y and f_u of its part "sleeve", where
    there is one. `f_u` is the rod's.
    """
    label = end.choice("label")
    with work.part(label + "Rod and fittings"):
        phi = work.fixed("phi", rules.factors.bolt, rules.factors.clause, note="bolt in tension")
        capacity = work.step(rods.thread_capacity, phi, end.take(work, "A_s"), f_u)
        work.check("thread in tension", N_c, capacity, "9.3.2.2")
        certified = _take(work, end, "R_f")
        work.check("fork and turnbuckle", N_c, certified, "practice", note=end.choice("certified"))
        for sleeve in end.parts["sleeve"]:
            _sleeve(rules, work, end, sleeve, N_c)
    with work.part(label + "Lug"):
        t_p = end.take(work, "t_p")
        f_yp, f_up = end.read(work, "f_yp", t_p), end.read(work, "f_up", t_p)
        (lug,) = end.parts["fork"]
        pin_plate(rules, work, end, lug, N_c, t_p, f_yp, f_up)
    work.leaves_out(
        "the lug away from the pin's hole and its fixing; locking of threads and fittings"
    )


def _sleeve(rules: Rules, work: Working, end: Inputs, sleeve: Inputs, N_c: Entry) -> None:
    phi = work.fixed("phi", rules.factors.member, rules.factors.clause, note="member in tension")
    d_th, d_sl = _take(work, end, "d_th"), _take(work, sleeve, "d_sl")
    f_y = sleeve.read(work, "f_y", d_sl)
    area = work.step(rods.sleeve_area, d_sl, d_th)
    work.check("sleeve", N_c, work.step(rods.sleeve_capacity, phi, area, f_y), "7.2")
    if "f_u" in sleeve.tables:
        fracture = work.step(rods.sleeve_fracture, phi, area, sleeve.read(work, "f_u", d_sl))
        work.check("sleeve, fracture", N_c, fracture, "7.2")
    work.check(
        "thread in the sleeve",
        d_th,
        _take(work, sleeve, "l_en"),
        "practice",
        kind="detailing",
        note="at least one diameter each side; common practice, no source",
    )
