"""Bolts as bought, and room for nut and wrench: what a bolted end asks of the workshop."""

from __future__ import annotations

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.errors import TensionlibError
from tensionlib.joints.ends import Bolted
from tensionlib.joints.pattern_end import BoltedPattern, Covers
from tensionlib.joints.room import (
    Room,
    washer_at_root,
    washer_at_toe,
    wrench_at_bolt,
    wrench_at_leg,
)
from tensionlib.joints.stated import in_mm
from tensionlib.members.geometry import Seat
from tensionlib.steel import Section, bolt
from tensionlib.steel.bolt_lengths import BoltLength, longer_length, pick_length

_LEGS = ("long leg", "short leg", "leg")


def plies(end: Bolted | BoltedPattern, place: Seat) -> list[float]:
    """Thickness of each ply a bolt goes through, mm: member, packing and gusset or covers."""
    t, t_p = place.thickness, in_mm(end.plate.thickness)
    packing = [in_mm(end.packing)] if end.packing is not None else []
    if place.planes == 1:
        return [t, *packing, t_p]
    if isinstance(end.plate, Covers):
        return [t_p, *packing, t, *packing, t_p]
    return [t, *packing, t_p, *packing, t]


def choose_bolt(end: Bolted | BoltedPattern, place: Seat) -> BoltLength:
    """The bolt to buy: the shortest, but where the threads are to be out of the shear planes one
    that has them out, its head on either side.

    Raises
    ------
    DataNotFoundError, InputError
        Where no length on sale fits.
    """
    size, through = bolt(end.bolts).size, plies(end, place)
    tried = [pick_length(size, through, head_on_first=side) for side in (True, False)]
    if end.threads == "out of shear plane":
        longer = (longer_length(size, through, head_on_first=side) for side in (True, False))
        tried += [found for found in longer if found is not None]
    return next((found for found in tried if found.clear_of_threads), tried[0])


def bought(end: Bolted | BoltedPattern, place: Seat, prefix: str) -> tuple[Inputs, ...]:
    """The bolt to buy as inputs; a word of why where none is held."""
    try:
        found = choose_bolt(end, place)
    except TensionlibError as error:
        why = {"why": str(error)}
        return (Inputs({"held": "no"}, {}, {}, prefix + "bolt: ", words=why),)
    source = "ISO 4014 and AS/NZS 1252, from memory"
    numbers = {
        "l_grip": Number(found.grip, "plies together"),
        "L_bolt": Number(found.nominal, source),
        "l_shank": Number(found.shank, source),
        "z_plane": Number(max(found.planes_at), "farthest shear plane from under the head"),
    }
    washers = f"{found.washers_nut} washer{'s' if found.washers_nut != 1 else ''} under the nut"
    words = f"{found.designation}, {washers}" + "".join(f"; {note}" for note in found.notes)
    choices = {"held": "yes", "threads": end.threads}
    beside = {"words": words}
    if found.clear_of_threads and end.threads == "in shear plane":
        beside["clear"] = (
            "This bolt keeps its threads out of the shear planes; they are counted in, which is"
            " on the safe side."
        )
    return (Inputs(choices, numbers, {}, prefix + "bolt: ", words=beside),)


def room_inputs(
    section: Section, end: Bolted | BoltedPattern, place: Seat, prefix: str
) -> tuple[Inputs, ...]:
    """Each check of room for washer, nut and wrench, as inputs."""
    size = bolt(end.bolts).size
    try:
        found = _rooms(section, end, place, size)
    except TensionlibError:
        return ()
    return tuple(
        Inputs(
            {"what": room.what, "note": room.note, "number": str(k)},
            {"needs": Number(room.needs, room.note), "has": Number(room.has, "geometry")},
            {},
            f"{prefix}room {k}: ",
        )
        for k, room in enumerate(found, start=1)
    )


def _rooms(section: Section, end: Bolted | BoltedPattern, place: Seat, size: str) -> list[Room]:
    d = section.dims
    lines, nearest = _lines(end), _nearest(end)
    found: list[Room] = []
    if end.to in _LEGS and lines:
        found += [
            washer_at_root(lines[0], d["t"], d["r1"], size),
            wrench_at_leg(lines[0], d["t"], size),
            washer_at_toe(place.width, lines[-1], d["r2"], size),
        ]
    if nearest is not None:
        found.append(wrench_at_bolt(nearest, size, "nearest bolts"))
    return found


def _lines(end: Bolted | BoltedPattern) -> list[float]:
    """Places of the bolts across the element on the gusset, mm from its heel, in order."""
    if isinstance(end, Bolted):
        first = in_mm(end.gauge)
        return [first] if end.lines == 1 else [first, first + in_mm(end.line_spacing)]
    return sorted({in_mm(h.y) for h in end.holes.holes if h.bolt and end.at_gusset(h.element)})


def bolt_places(end: Bolted | BoltedPattern) -> list[tuple[float, float]]:
    """Bolts of the element on the gusset: along the member from its end, and across from its
    first line or its reference edge, mm."""
    if isinstance(end, BoltedPattern):
        return [
            (in_mm(h.x), in_mm(h.y)) for h in end.holes.holes if h.bolt and end.at_gusset(h.element)
        ]
    first = in_mm(end.end_distance)
    return [
        (first + i * in_mm(end.pitch) + j * in_mm(end.stagger), j * in_mm(end.line_spacing))
        for i in range(end.per_line)
        for j in range(end.lines)
    ]


def _nearest(end: Bolted | BoltedPattern) -> float | None:
    """Distance of the nearest two bolts, mm; None for one bolt."""
    at = bolt_places(end)
    apart = [((x - u) ** 2 + (y - v) ** 2) ** 0.5 for k, (x, y) in enumerate(at) for u, v in at[:k]]
    return min(apart, default=None)
