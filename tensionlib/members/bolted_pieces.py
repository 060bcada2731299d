"""What a walk is given of a bolted end: bolts, layout, room, and what does not go together."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.joints.ends import AGREE_BOLTED
from tensionlib.joints.stated import in_mm
from tensionlib.members.fastening import bought, room_inputs
from tensionlib.members.geometry import FITS, Fit, seat
from tensionlib.members.pieces import NOTHING, Given, Piece, refuses
from tensionlib.steel import bolt

_STATED = "given"
_COUNTED = "from the connection"

# Bolts -------------------------------------------------------------------------------------


def _bolts(given: Given) -> Inputs:
    fastener = bolt(given.end.bolts)
    source = fastener.source
    numbers = {
        "d_f": Number(fastener.d_f, source),
        "f_uf": Number(fastener.f_uf, source),
        "A_c": Number(fastener.A_c, source),
        "A_o": Number(fastener.A_o, source),
    }
    if fastener.N_ti is not None:
        numbers["N_ti"] = Number(fastener.N_ti, source)
    return Inputs({"category": fastener.category, "bolt_class": fastener.grade}, numbers)


def _planes(given: Given) -> Inputs:
    planes = Number(float(seat(given.section, given.end).planes), _COUNTED)
    return Inputs({}, {"n_n": planes, "n_x": planes, "n_ei": planes})


def _cut(given: Given) -> Inputs:
    return Inputs({"threads": given.end.threads, "edge_kind": given.end.edge_kind}, {})


def _slip(given: Given) -> Inputs:
    return Inputs({}, {"mu": Number(given.end.slip_factor, _STATED)})


def _packed(given: Given) -> Inputs:
    packing = given.end.packing
    return NOTHING if packing is None else Inputs({}, {"t_k": Number(in_mm(packing), _STATED)})


def _bought(given: Given) -> Inputs:
    end = given.end
    return Inputs({}, {}, parts={"bought": bought(end, seat(given.section, end), given.prefix)})


def _room(given: Given) -> Inputs:
    section, end = given.section, given.end
    return Inputs(
        {}, {}, parts={"room": room_inputs(section, end, seat(section, end), given.prefix)}
    )


def _served(given: Given) -> Inputs:
    force = given.service
    if force is None:
        return Inputs({}, {}, parts={"service": ()})
    served = Inputs({}, {"N_star_ser": force}, {}, given.prefix + "service ")
    return Inputs({}, {}, parts={"service": (served,)})


FASTENER_PIECES = (
    Piece(_bolts, ("end.bolts",)),
    Piece(_planes, ("section", "end.to")),
    Piece(_slip, ("end.slip_factor",)),
    Piece(_packed, ("end.packing",)),
    Piece(_cut, ("end.threads", "end.edge_kind")),
    Piece(
        _bought,
        ("section", "end.to", "end.bolts", "end.threads", "end.packing", "end.plate.thickness"),
    ),
    Piece(_served, ("service",)),
)
"""What every bolted end has of its bolts."""

_LAYOUT = ("end.lines", "end.per_line", "end.pitch", "end.line_spacing", "end.stagger")
ROOM_PIECE = Piece(
    _room, ("section", "end.to", "end.bolts", "end.gauge", "end.end_distance", *_LAYOUT)
)
"""Room for washer and wrench: advice, which decides nothing."""

# Layout of a regular end -------------------------------------------------------------------


def _counts(given: Given) -> Inputs:
    end = given.end
    numbers = {
        "n_l": Number(float(end.lines), _STATED),
        "n_p": Number(float(end.per_line), _STATED),
    }
    return Inputs({}, numbers)


def _ends(given: Given) -> Inputs:
    end = given.end
    beyond = end.plate_end_distance
    numbers = {
        "e_1": Number(in_mm(end.end_distance), _STATED),
        "e_p": Number(in_mm(end.end_distance), "taken as the member's end distance")
        if beyond is None
        else Number(in_mm(beyond), _STATED),
    }
    return Inputs({}, numbers)


def _pitch(given: Given) -> Inputs:
    end = given.end
    if end.per_line == 1 or end.pitch is None:
        return NOTHING
    return Inputs({}, {"s_p": Number(in_mm(end.pitch), _STATED)})


def _stated(name: str, symbol: str) -> Piece:
    def make(given: Given) -> Inputs:
        value = getattr(given.end, name)
        return NOTHING if value is None else Inputs({}, {symbol: Number(in_mm(value), _STATED)})

    return Piece(make, (f"end.{name}",))


def _staggered(given: Given) -> Inputs:
    stagger = in_mm(given.end.stagger)
    if stagger > 0.0:
        return Inputs({"pattern": "staggered"}, {"s_2": Number(stagger, _STATED)})
    return Inputs({"pattern": "straight"}, {})


def _placed(given: Given) -> Inputs:
    place = seat(given.section, given.end)
    choices = {
        "hole_kind": "standard",
        "side_edge": "rolled" if place.free_edge else "none",
        "lines_from": place.lines_from,
    }
    return Inputs(choices, {})


BOLTED_PIECES = (
    *FASTENER_PIECES,
    Piece(_counts, ("end.lines", "end.per_line")),
    Piece(_ends, ("end.end_distance", "end.plate_end_distance")),
    Piece(_pitch, ("end.per_line", "end.pitch")),
    _stated("line_spacing", "s_g"),
    _stated("gauge", "g"),
    _stated("plate_edge_distance", "e_s"),
    _stated("clearance", "c_h"),
    Piece(_staggered, ("end.stagger",)),
    Piece(_placed, ("section", "end.to")),
)

# What does not go together -----------------------------------------------------------------


def _refusal(fit: Fit) -> Piece:
    def make(given: Given) -> Inputs:
        end = given.end
        d_f = bolt(end.bolts).d_f
        if end.clearance is not None:
            hole = d_f + in_mm(end.clearance)
        else:
            hole, _ = given.standard.hole_size(d_f, "standard")
        fit.check(given, hole)
        return NOTHING

    return Piece(make, ("standard", "end.bolts", "end.clearance", *fit.reads))


BOLTED_CHECKS = (
    *(refuses(agree, reads) for agree, reads in AGREE_BOLTED),
    *(_refusal(fit) for fit in FITS),
)
"""Refuse fields that do not go together, and holes that overlap or leave the part."""
