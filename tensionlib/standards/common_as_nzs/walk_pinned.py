"""The walk of AS 4100 and NZS 3404 for a pinned end: pin, eye, fork plates."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.common_as_nzs import bolts, pins
from tensionlib.standards.common_as_nzs.pins import PINS
from tensionlib.standards.common_as_nzs.rules import Rules


def _take(work: Working, inputs: Inputs, name: str) -> Entry:
    return inputs.take(work, name, PINS[name])


def eye_net_area(work: Working, end: Inputs) -> Entry:
    """Net area of the eye across its hole.

    Takes t and d_hp of the end and w_e of its part "eye".
    """
    (eye,) = end.parts["eye"]
    return work.step(
        pins.eye_net, _take(work, eye, "w_e"), _take(work, end, "d_hp"), end.take(work, "t")
    )


def pinned_end(
    rules: Rules, work: Working, end: Inputs, N_c: Entry, f_y: Entry, f_u: Entry
) -> None:
    """Write the checks of a pinned end for the design action on the connection.

    Takes of the end the numbers t, t_p, d_p, d_hp, f_ypin, n_sp, c_p, the choices "label",
    "rotates" and "earthquake", the tables f_yp and f_up, and n_f, w_e, e_e of each of its parts
    "eye" and "fork". `f_y` and `f_u` are the flat's.
    """
    label = end.choice("label")
    t, t_p = end.take(work, "t"), end.take(work, "t_p")
    with work.part(label + "Pin"):
        _pin(rules, work, end, N_c, t, t_p)
    (eye,), (fork,) = end.parts["eye"], end.parts["fork"]
    with work.part(label + "Eye"):
        pin_plate(rules, work, end, eye, N_c, t, f_y, f_u)
    with work.part(label + "Fork plates"):
        f_yp, f_up = end.read(work, "f_yp", t_p), end.read(work, "f_up", t_p)
        pin_plate(rules, work, end, fork, N_c, t_p, f_yp, f_up)
    work.leaves_out(
        "the fork plates away from the pin's hole and their fixing; how the pin is kept in place",
        "the taper from the flat to an eye wider than it",
    )


def _pin(rules: Rules, work: Working, end: Inputs, N_c: Entry, t: Entry, t_p: Entry) -> None:
    phi = work.fixed("phi", rules.factors.pin, rules.factors.clause, note="pin")
    d_p, f_y = _take(work, end, "d_p"), _take(work, end, "f_ypin")
    A_p = work.step(pins.pin_area, d_p)
    shear = work.step(pins.pin_shear, f_y, _take(work, end, "n_sp"), A_p)
    work.check("pin shear", N_c, work.step(pins.design_pin, phi, shear), "9.5.1")
    rotates = end.choice("rotates")
    k_p = work.fixed(
        PINS["k_p"],
        pins.ROTATION_FACTORS[rotates],
        "9.5.2",
        note="the pin rotates" if rotates == "yes" else "the pin does not rotate",
        source="9.5.2, from memory, sure",
    )
    (eye,), (fork,) = end.parts["eye"], end.parts["fork"]
    for where, part, thickness in (("eye", eye, t), ("fork plates", fork, t_p)):
        bearing = work.step(pins.pin_bearing, f_y, d_p, _take(work, part, "n_f"), thickness, k_p)
        capacity = work.step(pins.design_pin, phi, bearing, gives=PINS["phiV_bp"], clause="9.5.2")
        work.check(f"bearing on the pin, {where}", N_c, capacity, "9.5.2")
    moment = work.step(pins.pin_moment, N_c, t, _take(work, end, "c_p"), t_p)
    M_p = work.step(pins.pin_bending, f_y, work.step(pins.pin_modulus, d_p))
    work.check("pin bending", moment, work.step(pins.design_bending, phi, M_p), "9.5.3")


def pin_plate(
    rules: Rules,
    work: Working,
    end: Inputs,
    plate: Inputs,
    N_c: Entry,
    t: Entry,
    f_y: Entry,
    f_u: Entry,
) -> None:
    """Bearing and tear-out at the pin, and the proportions of 7.5.

    The net area that 7.5 asks for is the greater of what yielding and fracture of 7.2 need for the
    design action on the connection: the conservative reading. Takes d_p and d_hp of the end and
    n_f, w_e and e_e of the `plate`, whose end is square or rounded about the hole.
    """
    d_p, d_hp, n_f = _take(work, end, "d_p"), _take(work, end, "d_hp"), _take(work, plate, "n_f")
    e_e, w_e = _take(work, plate, "e_e"), _take(work, plate, "w_e")
    phi = work.fixed("phi", rules.factors.ply, rules.factors.clause, note="ply in bearing at a pin")
    bearing = rules.bearing(work, end, d_p, t, f_u, "V_bb", "bearing of the ply at the pin")
    a_e = work.step(pins.clear_beyond, e_e, d_hp, d_p)
    tear_out = work.step(bolts.ply_tear_out, a_e, t, f_u, title="tear-out of the ply at the pin")
    V_b = work.least(PINS["V_ppin"], bearing, tear_out, title="capacity of a ply at the pin")
    capacity = work.step(pins.plies_at_pin, phi, n_f, V_b)
    work.check("ply bearing and tear-out", N_c, capacity, "9.5.4")
    w_s = work.step(pins.beside, w_e, d_hp)
    work.check(
        "thickness beside the hole",
        work.step(pins.least_thickness, w_s),
        t,
        "7.5",
        kind="detailing",
    )
    phi_m = work.fixed("phi", rules.factors.member, rules.factors.clause, note="member in tension")
    A_req = work.step(pins.required_area, N_c, phi_m, f_y, f_u)
    r_b = work.least(
        PINS["r_b"],
        e_e,
        work.step(pins.side_at_45, w_e),
        title="least distance beyond the hole, within 45° of the force",
        clause="7.5",
    )
    work.assume(
        f"{end.choice('label')}plates end square beyond the pin, or rounded about the hole no"
        " closer to its centre than their end"
    )
    beyond = work.step(pins.area_beyond, n_f, r_b, d_hp, t)
    work.check("area beyond the hole", A_req, beyond, "7.5")
    across = work.step(pins.area_across, n_f, w_s, t)
    work.check("area across the hole", work.step(pins.required_across, A_req), across, "7.5")
