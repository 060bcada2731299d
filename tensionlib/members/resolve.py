"""From a member as stated to the numbers, choices and tables a standard's walk is given."""

from __future__ import annotations

import math
from functools import cache

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.calculation.tables import Band, ThresholdTable
from tensionlib.errors import InputError
from tensionlib.joints.ends import Bolted, Gusset, Welded
from tensionlib.joints.fillet_group import elastic_stress, properties
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.pattern_end import BoltedPattern
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.stated import in_mm
from tensionlib.joints.welded_runs import WeldedRuns, member_line
from tensionlib.members.beside import Across
from tensionlib.members.fastening import bolt_places, bought, room_inputs
from tensionlib.members.geometry import Seat, seat, thickest
from tensionlib.members.gusset import gusset_inputs
from tensionlib.members.member import End, Member
from tensionlib.members.pattern import PatternGeometry, pattern_numbers
from tensionlib.quantities import ANGLE, LENGTH, door, quantity
from tensionlib.standards import Standard
from tensionlib.steel import Grade, Section, bolt, grade, weld_metal
from tensionlib.steel.bolts import SIZES
from tensionlib.steel.moduli import component_radius, elastic_moduli, sag_inertia, slender_plate
from tensionlib.steel.sections import DENSITY

_STATED = "given"
GRAVITY = 9.81  # m/s²
_COUNTED = "from the connection"


def member_inputs(member: Member, service: Number | None) -> Inputs:
    """Numbers, choices and tables of the member itself; `service` is its force in service."""
    section = member.profile
    steel = member.material.made_as(section.shape)
    source = section.source
    numbers = {
        "A_g": Number(section.A, source),
        "L": Number(in_mm(member.length), _STATED),
        "t_y": Number(thickest(section), source),
    }
    if section.r_min is not None:
        numbers["r_min"] = Number(section.r_min, source)
    if "d" in section.dims:
        numbers["d"] = Number(section.dims["d"], source)
    if service is not None:
        numbers["N_star_ser"] = service
    seismic = member.overstrength
    if seismic is not None and seismic.factor is not None:
        numbers["phi_oms"] = Number(seismic.factor, _STATED)
    if member.ties is not None:
        numbers["L_s"] = Number(in_mm(member.ties), _STATED)
        numbers["r_c"] = Number(component_radius(section), section.source)
    beside = member.across
    bending: tuple[Inputs, ...] = ()
    if beside is not None:
        for name, limit in (("Delta_max", "sag_limit"), ("Delta_Lmax", "stretch_limit")):
            if getattr(beside, limit) is not None:
                numbers[name] = Number(in_mm(getattr(beside, limit)), _STATED)
        bending = (_bending(member, beside),)
    choices = {
        "shape": section.shape,
        "category": "none" if seismic is None else seismic.category,
    }
    tables = _tables(steel, "f_y", "f_u", "the section")
    return Inputs(choices, numbers, tables, "member: ", {"bending": bending})


def _bending(member: Member, beside: Across) -> Inputs:
    """What bends the member: loads, offsets, moduli, its most slender outstand."""
    section = member.profile
    Z_x, Z_y = elastic_moduli(section)
    computed = "computed from the outline, first yield at its worst corner"
    numbers = {"Z_ex": Number(Z_x, computed), "Z_ey": Number(Z_y, computed)}
    plate = slender_plate(section)
    choices = {"plate": "none" if plate is None else plate[2]}
    if plate is not None:
        numbers |= {
            name: Number(x, section.source)
            for name, x in zip(("b_s", "t_o"), plate[:2], strict=True)
        }
    span = member.length if beside.span is None else beside.span
    numbers["L_b"] = Number(in_mm(span), _STATED)
    load = in_mm(beside.load)
    if beside.self_weight or load:
        mass = section.A * DENSITY
        weight = mass * GRAVITY if beside.self_weight else 0.0
        origin = f"{mass * 1e3:.4g} kg/m at 9.81 m/s²" if beside.self_weight else "left out"
        numbers |= {
            "w_g": Number(weight, origin),
            "gamma_g": Number(beside.weight_factor, _STATED),
            "w_x": Number(load, _STATED),
        }
        if beside.self_weight:
            numbers["I_sag"] = Number(sag_inertia(section), "from the outline, free to sag aside")
    if in_mm(beside.side_load):
        numbers["w_y"] = Number(in_mm(beside.side_load), _STATED)
    for name, offset in (("e_x", beside.offset_x), ("e_y", beside.offset_y)):
        if in_mm(offset):
            numbers[name] = Number(in_mm(offset), _STATED)
    return Inputs(choices, numbers, {}, "across: ")


def end_inputs(
    member: Member,
    end: End,
    standard: Standard,
    *,
    label: str,
    prefix: str,
    service: Number | None,
) -> Inputs:
    """Numbers, choices and tables of one end.

    Parameters
    ----------
    standard : Standard
        Gives the sizes of holes and what block shear makes of the strengths.
    service : Number, optional
        Force in service, which slip of tensioned friction bolts is checked for.
    label : str
        What the titles of the end's parts begin with: "" or "End 1: ".
    prefix : str
        What the keys of the end's inputs begin with.
    """
    section = member.profile
    place = seat(section, end)
    common = {
        "n_e": Number(float(place.plies), _COUNTED),
        "n_g": Number(float(place.gussets), _COUNTED),
        "t": Number(place.thickness, section.source),
        "b": Number(place.width, section.source),
        **_plate(end.plate),
    }
    if end.k_te is not None:
        common["k_t"] = Number(end.k_te, f"stated by the engineer: {end.k_te_reason}")
    # Either leg of an equal angle is the same leg.
    equal = section.shape == "angle" and section.dims["b1"] == section.dims["b2"]
    to = "leg" if equal else end.to
    seismic = member.overstrength
    yields = seismic is not None and seismic.category != "4"
    choices = {
        "label": label,
        "kind": end.kind,
        "to": to,
        "shape": section.shape,
        "earthquake": "yes" if yields else "no",
    }
    if seismic is not None and seismic.bearing_factor is not None:
        common["C_1"] = Number(seismic.bearing_factor, _STATED)
    parts: dict[str, tuple[Inputs, ...]] = {"hanger": _hanger(end.plate.hanger, prefix)}
    plate_steel = grade(end.plate.steel, "plate.steel")
    plate_steel.suits("plate", "plate.steel")
    tables = _tables(plate_steel, "f_yp", "f_up", "the gusset")
    plate_numbers, own = gusset_inputs(
        end.plate, spread_starts(end, place), getattr(end, "metal", "E48XX"), prefix
    )
    common |= plate_numbers
    parts["gusset"] = own
    if isinstance(end, Welded):
        more, also = _welded(end)
        if end.to == "slot":
            more |= _slotted(section)
            also["shear_lag"] = "by length" if end.shear_lag_by_length else "none"
    elif isinstance(end, WeldedRuns):
        more, also = _welded_runs(section, end)
    elif isinstance(end, Pinned):
        more, also, within = _pinned(section, end, prefix)
        parts |= within
    elif isinstance(end, Threaded):
        more, also, within = _rod(section, end, prefix)
        parts |= within
    else:
        served = {} if service is None else {"N_star_ser": service}
        parts["bought"] = bought(end, place, prefix)
        parts["room"] = room_inputs(section, end, place, prefix)
        parts["service"] = (Inputs({}, served, {}, prefix + "service "),) if served else ()
        if isinstance(end, Bolted):
            more, also = _bolted(end, place)
        else:
            more, also = _fasteners(end, place)
            shape = PatternGeometry(member, end, standard)
            numbers, found, within = pattern_numbers(shape, prefix)
            more, also, parts = more | numbers, also | found, parts | within
    return Inputs(choices | also, common | more, tables, prefix, parts)


def _plate(plate: Gusset) -> dict[str, Number]:
    numbers = {"t_p": Number(in_mm(plate.thickness), _STATED)}
    if plate.width is not None:
        numbers["b_p"] = Number(in_mm(plate.width), _STATED)
    return numbers


@cache
def _table(steel: Grade, strength: str, of: str) -> ThresholdTable:
    bands = tuple(
        Band(row.limit, row.closed, row.f_y if strength == "f_y" else row.f_u) for row in steel.rows
    )
    return ThresholdTable(f"{strength} by the thickness of {of}", steel.known, {steel.name: bands})


def _tables(steel: Grade, f_y: str, f_u: str, of: str) -> dict[str, tuple[ThresholdTable, str]]:
    return {
        f_y: (_table(steel, "f_y", of), steel.name),
        f_u: (_table(steel, "f_u", of), steel.name),
    }


def _fasteners(
    end: Bolted | BoltedPattern, place: Seat
) -> tuple[dict[str, Number], dict[str, str]]:
    """What every bolted end has of its bolts."""
    fastener = bolt(end.bolts)
    source = fastener.source
    planes = Number(float(place.planes), _COUNTED)
    numbers = {
        "d_f": Number(fastener.d_f, source),
        "f_uf": Number(fastener.f_uf, source),
        "A_c": Number(fastener.A_c, source),
        "A_o": Number(fastener.A_o, source),
        "n_n": planes,
        "n_x": planes,
        "n_ei": planes,
        "mu": Number(end.slip_factor, "given"),
    }
    if fastener.N_ti is not None:
        numbers["N_ti"] = Number(fastener.N_ti, source)
    if end.packing is not None:
        numbers["t_k"] = Number(in_mm(end.packing), _STATED)
    choices = {
        "threads": end.threads,
        "category": fastener.category,
        "bolt_class": fastener.grade,
        "edge_kind": end.edge_kind,
    }
    return numbers, choices


def _bolted(end: Bolted, place: Seat) -> tuple[dict[str, Number], dict[str, str]]:
    numbers, choices = _fasteners(end, place)
    numbers |= {
        "n_l": Number(float(end.lines), _STATED),
        "n_p": Number(float(end.per_line), _STATED),
        "e_1": Number(in_mm(end.end_distance), _STATED),
        "e_p": Number(in_mm(end.end_distance), "taken as the member's end distance")
        if end.plate_end_distance is None
        else Number(in_mm(end.plate_end_distance), _STATED),
    }
    stated = {
        "s_p": end.pitch if end.per_line > 1 else None,
        "s_g": end.line_spacing,
        "g": end.gauge,
        "e_s": end.plate_edge_distance,
        "c_h": end.clearance,
    }
    numbers |= {n: Number(in_mm(v), _STATED) for n, v in stated.items() if v is not None}
    staggered = end.stagger is not None and in_mm(end.stagger) > 0.0
    if staggered:
        numbers["s_2"] = Number(in_mm(end.stagger), _STATED)
    choices |= {
        "pattern": "staggered" if staggered else "straight",
        "hole_kind": "standard",
        "side_edge": "rolled" if place.free_edge else "none",
        "lines_from": place.lines_from,
    }
    return numbers, choices


def _welded(end: Welded) -> tuple[dict[str, Number], dict[str, str]]:
    metal = weld_metal(end.metal)
    numbers = {
        "t_w": Number(in_mm(end.leg_size), _STATED),
        "l_1": Number(in_mm(end.length_1), _STATED),
        "l_2": Number(in_mm(end.length_2), _STATED),
        "f_uw": Number(metal.f_uw, metal.source),
    }
    if end.transverse is not None:
        numbers["l_t"] = Number(in_mm(end.transverse), _STATED)
    if end.to == "slot":
        numbers["n_s"] = Number(2.0, _COUNTED)
        numbers["c_s"] = Number(in_mm(end.slot_clearance), _STATED)
    return numbers, {"quality": end.quality}


def spread_starts(end: End, place: Seat) -> list[tuple[float, float]]:
    """Where the force begins to spread in the gusset, in end coordinates (u, v), mm: each bolt,
    or both ends of each weld; v = 0 is the middle of the bolts or of the element."""
    if isinstance(end, Bolted | BoltedPattern):
        at = bolt_places(end)
        middle = math.fsum(y for _, y in at) / len(at)
        return [(x, y - middle) for x, y in at]
    if isinstance(end, Pinned | Threaded):
        return [(0.0, 0.0)]
    if isinstance(end, WeldedRuns):
        runs = [run.as_run() for run in end.runs]
        points = [p for r in runs for p in ((r.x_1, r.y_1), (r.x_2, r.y_2))]
        return [(x, y - place.width / 2) for x, y in points]
    b = place.width / 2
    first, second = in_mm(end.length_1), in_mm(end.length_2)
    return [(0.0, -b), (0.0, b), (first, -b), (second, b)]


def _hanger(hanger: Hanger | None, prefix: str) -> tuple[Inputs, ...]:
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
    table = _table(steel, "f_y", "the hanger's flange"), steel.name
    choices = {"threads": hanger.threads, "inclined": "yes" if angle > 0.0 else "no"}
    return (Inputs(choices, numbers, {"f_y": table}, prefix + "hanger: "),)


def _pinned(
    section: Section, end: Pinned, prefix: str
) -> tuple[dict[str, Number], dict[str, str], dict[str, tuple[Inputs, ...]]]:
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
    return numbers, {"rotates": "yes" if end.rotates else "no"}, parts


def _rod(
    section: Section, end: Threaded, prefix: str
) -> tuple[dict[str, Number], dict[str, str], dict[str, tuple[Inputs, ...]]]:
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
        tables = _tables(steel, "f_y", "f_u", "the sleeve")
        sleeve = (Inputs({}, sizes, tables, prefix + "sleeve: "),)
    choices = {
        "braced": "yes" if end.bracing and end.coupling == "turnbuckle" else "no",
        "certified": f"certified: {end.certified_by}",
    }
    parts: dict[str, tuple[Inputs, ...]] = {
        "fork": (Inputs({}, lug, {}, prefix + "lug: "),),
        "sleeve": sleeve,
    }
    return numbers, choices, parts


def _slotted(section: Section) -> dict[str, Number]:
    """What a slotted tube's shear lag goes by: its height along the gusset, its centroid off it."""
    d = section.dims
    if section.shape == "CHS":
        height, off = d["d"], d["d"] / math.pi
        origin = "outside diameter over π"
    else:
        height, width = d["d"], d["b"]
        off = (width * width + 2 * width * height) / (4 * (width + height))
        origin = "(B² + 2BH) / (4(B + H)) of the tube"
    return {"h_s": Number(height, section.source), "x_bar": Number(off, origin)}


def _welded_runs(section: Section, end: WeldedRuns) -> tuple[dict[str, Number], dict[str, str]]:
    metal = weld_metal(end.metal)
    runs = [run.as_run() for run in end.runs]
    group = properties(runs)
    line = member_line(section, end.to)
    peak = elastic_stress(group, line)
    ys = [y for run in runs for y in (run.y_1, run.y_2)]
    # The force spreads along runs that lie along it; a group without such runs spreads nothing.
    along = [run.length for run in runs if run.angle < math.pi / 4]
    legs = [run.leg for run in runs]
    found = "from the runs"
    numbers = {
        "f_uw": Number(metal.f_uw, metal.source),
        "A_wn": Number(group.area, found),
        "I_wn": Number(group.I_p, found),
        "e_w": Number(group.y_c - line, "member's centroid and the weld's centroid"),
        "x_w": Number(peak.x, f"end of run {peak.mark}"),
        "y_w": Number(peak.y, f"end of run {peak.mark}"),
        "t_w": Number(min(legs), "smallest leg of the runs"),
        "l_min": Number(min(along, default=0.0), found),
        "l_max": Number(max(run.length for run in runs), found),
        "l_r": Number(min(run.length for run in runs), found),
        "b_r": Number(max(ys) - min(ys), found),
    }
    if max(legs) > min(legs):
        numbers["t_w2"] = Number(max(legs), "largest leg of the runs")
    return numbers, {"quality": end.quality, "worst": peak.mark}
