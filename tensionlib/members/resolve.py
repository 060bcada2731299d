"""From a member as stated to the numbers, choices and tables a standard's walk is given."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.joints.ends import Bolted, Welded
from tensionlib.joints.stated import in_mm
from tensionlib.members.beside import Across
from tensionlib.members.bolted_pieces import (
    BOLTED_CHECKS,
    BOLTED_PIECES,
    FASTENER_PIECES,
    ROOM_PIECE,
)
from tensionlib.members.geometry import check_gap, seat, thickest
from tensionlib.members.gusset import gusset_inputs, spread_starts
from tensionlib.members.member import End
from tensionlib.members.other_pieces import hanging, pinned, rod
from tensionlib.members.pattern import PatternGeometry, pattern_numbers
from tensionlib.members.pieces import NOTHING, Given, Piece, gather
from tensionlib.members.strengths import refuse_beyond, strength_tables
from tensionlib.members.welded_pieces import WELDED_PIECES, any_runs
from tensionlib.quantities import Quantity
from tensionlib.steel import Section, grade
from tensionlib.steel.moduli import component_radius, elastic_moduli, sag_inertia, slender_plate
from tensionlib.steel.sections import DENSITY

_STATED = "given"
GRAVITY = 9.81  # m/s²
_COUNTED = "from the connection"


# The member ------------------------------------------------------------------------------


def _size(given: Given) -> Inputs:
    section = given.section
    source = section.source
    numbers = {"A_g": Number(section.A, source), "t_y": Number(thickest(section), source)}
    if section.r_min is not None:
        numbers["r_min"] = Number(section.r_min, source)
    if "d" in section.dims:
        numbers["d"] = Number(section.dims["d"], source)
    return Inputs({"shape": section.shape}, numbers)


def _length(given: Given) -> Inputs:
    return Inputs({}, {"L": Number(in_mm(given.length), _STATED)})


def _in_service(given: Given) -> Inputs:
    return NOTHING if given.service is None else Inputs({}, {"N_star_ser": given.service})


def _seismic(given: Given) -> Inputs:
    seismic = given.overstrength
    if seismic is None:
        return Inputs({"category": "none"}, {})
    stated = {} if seismic.factor is None else {"phi_oms": Number(seismic.factor, _STATED)}
    return Inputs({"category": seismic.category}, stated)


def _tied(given: Given) -> Inputs:
    if given.ties is None:
        return NOTHING
    numbers = {
        "L_s": Number(in_mm(given.ties), _STATED),
        "r_c": Number(component_radius(given.section), given.section.source),
    }
    return Inputs({}, numbers)


def _strengths(given: Given) -> Inputs:
    steel = given.steel.made_as(given.section.shape)
    tables = strength_tables(steel, "f_y", "f_u", "the section")
    refuse_beyond(tables, thickest(given.section))
    return Inputs({}, {}, tables)


def _across(given: Given) -> Inputs:
    beside = given.across
    if beside is None:
        return Inputs({}, {}, parts={"bending": ()})
    numbers = {
        name: Number(in_mm(getattr(beside, limit)), _STATED)
        for name, limit in (("Delta_max", "sag_limit"), ("Delta_Lmax", "stretch_limit"))
        if getattr(beside, limit) is not None
    }
    bending = _bending(given.section, given.length, beside)
    return Inputs({}, numbers, parts={"bending": (bending,)})


MEMBER_PIECES = (
    Piece(_size, ("section",)),
    Piece(_length, ("length",)),
    Piece(_in_service, ("service",)),
    Piece(_seismic, ("overstrength",)),
    Piece(_tied, ("section", "ties")),
    Piece(_strengths, ("section", "steel")),
    Piece(_across, ("section", "length", "across")),
)
"""Numbers, choices and tables of the member itself."""


def _bending(section: Section, length: Quantity, beside: Across) -> Inputs:
    """What bends the member: loads, offsets, moduli, its most slender outstand."""
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
    span = length if beside.span is None else beside.span
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


# Every end -------------------------------------------------------------------------------


def _kind(given: Given) -> Inputs:
    return Inputs({"label": given.label, "kind": given.end.kind}, {})


def _seated(given: Given) -> Inputs:
    section, end = given.section, given.end
    place = seat(section, end)
    numbers = {
        "n_e": Number(float(place.plies), _COUNTED),
        "n_g": Number(float(place.gussets), _COUNTED),
        "t": Number(place.thickness, section.source),
        "b": Number(place.width, section.source),
    }
    # Either leg of an equal angle is the same leg.
    equal = section.shape == "angle" and section.dims["b1"] == section.dims["b2"]
    return Inputs({"to": "leg" if equal else end.to, "shape": section.shape}, numbers)


def _in_its_gap(given: Given) -> Inputs:
    check_gap(given.section, given.end)
    return NOTHING


def _stated_factor(given: Given) -> Inputs:
    end = given.end
    if end.k_te is None:
        return NOTHING
    return Inputs({}, {"k_t": Number(end.k_te, f"stated by the engineer: {end.k_te_reason}")})


def _earthquake(given: Given) -> Inputs:
    seismic = given.overstrength
    yields = seismic is not None and seismic.category != "4"
    numbers = {}
    if seismic is not None and seismic.bearing_factor is not None:
        numbers["C_1"] = Number(seismic.bearing_factor, _STATED)
    return Inputs({"earthquake": "yes" if yields else "no"}, numbers)


def _plate_thickness(given: Given) -> Inputs:
    return Inputs({}, {"t_p": Number(in_mm(given.end.plate.thickness), _STATED)})


def _plate_width(given: Given) -> Inputs:
    width = given.end.plate.width
    return NOTHING if width is None else Inputs({}, {"b_p": Number(in_mm(width), _STATED)})


def _plate_strengths(given: Given) -> Inputs:
    steel = grade(given.end.plate.steel, "plate.steel")
    steel.suits("plate", "plate.steel")
    tables = strength_tables(steel, "f_yp", "f_up", "the gusset")
    refuse_beyond(tables, in_mm(given.end.plate.thickness))
    return Inputs({}, {}, tables)


def _hung(given: Given) -> Inputs:
    return Inputs({}, {}, parts={"hanger": hanging(given.end.plate.hanger, given.prefix)})


def _gusset_alone(given: Given) -> Inputs:
    """What is stated of a gusset without an outline of its own."""
    numbers, own = gusset_inputs(given.end.plate, (), "E48XX", given.prefix)
    return Inputs({}, numbers, parts={"gusset": own})


def _gusset_outlined(given: Given) -> Inputs:
    end = given.end
    starts = spread_starts(end, seat(given.section, end))
    metal = getattr(end, "metal", "E48XX")
    numbers, own = gusset_inputs(end.plate, starts, metal, given.prefix)
    return Inputs({}, numbers, parts={"gusset": own})


def _pattern(given: Given) -> Inputs:
    """The holes of an end with a pattern of its own, and what the searches found on it."""
    shape = PatternGeometry(given.section, given.steel, given.end, given.standard)
    numbers, choices, parts = pattern_numbers(shape, given.prefix)
    return Inputs(choices, numbers, parts=parts)


_PLATE_ALONE = (
    "end.plate.shape",
    "end.plate.compression",
    "end.plate.free_length",
    "end.plate.length_factor",
    "end.plate.support_quality",
)

# In the order of their messages where several things are wrong.
_COMMON = (
    Piece(_kind, ()),
    Piece(_seated, ("section", "end.to")),
    Piece(_in_its_gap, ("section", "end.plate.thickness")),
    Piece(_stated_factor, ("end.k_te", "end.k_te_reason")),
    Piece(_earthquake, ("overstrength",)),
    Piece(_plate_thickness, ("end.plate.thickness",)),
    Piece(_plate_width, ("end.plate.width",)),
    Piece(_hung, ("end.plate.hanger",)),
    Piece(_plate_strengths, ("end.plate.steel", "end.plate.thickness")),
)
_GUSSET_ALONE = Piece(_gusset_alone, _PLATE_ALONE)
_OTHERS = {
    "bolted pattern": (*FASTENER_PIECES, ROOM_PIECE),
    "welded runs": (),
    "pinned": (),
    "rod": (),
}
_OWN = {"bolted pattern": _pattern, "welded runs": any_runs, "pinned": pinned, "rod": rod}

REGULAR: dict[type, tuple[Piece, ...]] = {
    Bolted: (*_COMMON, *BOLTED_CHECKS, _GUSSET_ALONE, *BOLTED_PIECES),
    Welded: (*_COMMON, _GUSSET_ALONE, *WELDED_PIECES),
}
"""All that decides about a regular end on a gusset without an outline, in fine pieces."""


def is_regular(end: End) -> bool:
    """Whether an end is made of fine pieces: see `REGULAR`."""
    return type(end) in REGULAR and end.plate.shape is None


def whole_end(given: Given) -> Inputs:
    """Everything a walk is given of an end of any kind.

    Raises
    ------
    UnitError, InputError, DataNotFoundError
        For what does not fit or is not known, naming the field.
    """
    end = given.end
    if is_regular(end):
        aside = (ROOM_PIECE,) if isinstance(end, Bolted) else ()
        return gather((*REGULAR[type(end)], *aside), given)
    own: tuple[Piece, ...]
    if isinstance(end, Welded):
        own = WELDED_PIECES
    else:
        own = (*_OTHERS[end.kind], Piece(_OWN[end.kind], ()))
    return gather((*_COMMON, Piece(_gusset_outlined, ()), *own), given)
