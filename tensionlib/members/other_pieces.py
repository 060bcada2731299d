"""What a walk is given of a pinned end, a threaded rod, and a hanger's bolts in tension."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.errors import InputError
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.stated import in_mm
from tensionlib.members.pieces import Given
from tensionlib.members.strengths import strength_table, strength_tables
from tensionlib.quantities import ANGLE, LENGTH, door, quantity
from tensionlib.steel import bolt, grade
from tensionlib.steel.bolts import SIZES

_STATED = "given"
_COUNTED = "from the connection"


def pinned(given: Given) -> Inputs:
    """An eye on a pin between two fork plates."""
    section, end, prefix = given.section, given.end, given.prefix
    width = quantity(section.leg("plate"), LENGTH)
    numbers = {
        "d_p": Number(in_mm(end.pin), _STATED),
        "d_hp": Number(in_mm(end.hole), _STATED),
        "f_ypin": Number(in_mm(end.pin_f_y), "as certified"),
        "n_sp": Number(2.0, _COUNTED),
        "c_p": Number(in_mm(end.gap), "given; 2 mm unless stated"),
    }
    eye = {
        "n_f": Number(1.0, _COUNTED),
        "w_e": Number(end.eye(width), section.source if end.eye_width is None else _STATED),
        "e_e": Number(in_mm(end.edge_beyond), _STATED),
    }
    fork = {
        "n_f": Number(2.0, _COUNTED),
        "w_e": Number(in_mm(end.plate.width), _STATED),
        "e_e": Number(in_mm(end.plate_edge_beyond), _STATED),
    }
    parts: dict[str, tuple[Inputs, ...]] = {
        "eye": (Inputs({}, eye, {}, prefix + "eye: "),),
        "fork": (Inputs({}, fork, {}, prefix + "fork: "),),
    }
    return Inputs({"rotates": "yes" if end.rotates else "no"}, numbers, parts=parts)


def rod(given: Given) -> Inputs:
    """A threaded bar in a bought fork, with its turnbuckle or sleeve."""
    section, end, prefix = given.section, given.end, given.prefix
    size = SIZES[end.thread]
    if section.dims["d"] < size.d_f:
        raise InputError(
            f"thread: got {end.thread} on {section.designation}; the bar is thinner than the thread"
        )
    numbers = {
        "A_s": Number(size.A_s, size.source),
        "d_th": Number(size.d_f, size.source),
        "R_f": Number(in_mm(end.fork_capacity), end.certified_by),
        "d_p": Number(in_mm(end.pin), _STATED),
        "d_hp": Number(in_mm(end.hole), _STATED),
    }
    lug = {
        "n_f": Number(1.0, _COUNTED),
        "w_e": Number(in_mm(end.plate.width), _STATED),
        "e_e": Number(in_mm(end.plate_edge_beyond), _STATED),
    }
    sleeve: tuple[Inputs, ...] = ()
    if end.coupling == "sleeve":
        steel = grade(end.sleeve_steel, "sleeve_steel")
        sizes = {
            "d_sl": Number(in_mm(end.sleeve_diameter), _STATED),
            "l_en": Number(in_mm(end.engagement), _STATED),
        }
        tables = strength_tables(steel, "f_y", "f_u", "the sleeve")
        sleeve = (Inputs({}, sizes, tables, prefix + "sleeve: "),)
    choices = {
        "braced": "yes" if end.bracing and end.coupling == "turnbuckle" else "no",
        "certified": f"certified: {end.certified_by}",
    }
    parts: dict[str, tuple[Inputs, ...]] = {
        "fork": (Inputs({}, lug, {}, prefix + "lug: "),),
        "sleeve": sleeve,
    }
    return Inputs(choices, numbers, parts=parts)


def hanging(hanger: Hanger | None, prefix: str) -> tuple[Inputs, ...]:
    """The bolts in tension that the gusset hangs by."""
    if hanger is None:
        return ()
    fastener = bolt(hanger.bolts)
    one = Number(1.0, _COUNTED)
    angle = float(door("angle", hanger.angle, ANGLE).internal)
    numbers = {
        "n_t": Number(float(hanger.number), _STATED),
        "q": Number(hanger.prying, "allowance as stated; common practice, no source"),
        "theta": Number(angle, _STATED),
        "A_s": Number(fastener.A_s, fastener.source),
        "A_c": Number(fastener.A_c, fastener.source),
        "A_o": Number(fastener.A_o, fastener.source),
        "f_uf": Number(fastener.f_uf, fastener.source),
        "n_n": one,
        "n_x": one,
        "s_t": Number(in_mm(hanger.gauge), _STATED),
        "p_t": Number(in_mm(hanger.tributary), _STATED),
        "t_f1": Number(in_mm(hanger.thickness), _STATED),
    }
    steel = grade(hanger.steel, "hanger.steel")
    table = strength_table(steel, "f_y", "the hanger's flange"), steel.name
    choices = {"threads": hanger.threads, "inclined": "yes" if angle > 0.0 else "no"}
    return (Inputs(choices, numbers, {"f_y": table}, prefix + "hanger: "),)
