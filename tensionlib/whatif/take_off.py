"""What an alternative is made of, for comparing: mass, bolts, holes, weld metal, gusset plate.

Quantities for comparing alternatives with one another, not for ordering: the part of a gusset that
serves the joint is counted, not what it takes to reach its support, unless its outline is stated.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from tensionlib.joints.stated import in_mm
from tensionlib.members.geometry import seat
from tensionlib.members.pieces import Given
from tensionlib.steel import bolt
from tensionlib.steel.sections import DENSITY

SPREAD = math.tan(math.pi / 6)
# Least width of a gusset at a bolt, in bolt diameters: 1.5 each side; common practice, no source.
LEAST_WIDTH = 3.0


@dataclass(frozen=True)
class Term:
    """A number of one member or end, and the fields it reads: those of the end as "end.bolts"."""

    make: Callable[[Given], float]
    reads: tuple[str, ...]


def _member_mass(given: Given) -> float:
    return given.section.A * in_mm(given.length) * DENSITY


MEMBER_MASS = Term(_member_mass, ("section", "length"))
"""Mass of the member in kg, over its whole length."""


# Bolted ----------------------------------------------------------------------------------


def _bolts(given: Given) -> float:
    end = given.end
    if end.kind == "bolted":
        return float(end.lines * end.per_line * (2 if end.to == "both flanges" else 1))
    if end.kind == "bolted pattern":
        return float(sum(hole.bolt for hole in end.holes.holes))
    return 0.0


def _holes(given: Given) -> float:
    """Holes drilled: in each ply of member and gusset that a bolt goes through."""
    place = seat(given.section, given.end)
    end = given.end
    plies = place.planes + 1
    if end.kind == "bolted pattern":
        return float(len(end.holes.holes) * plies)
    return _bolts(given) * plies if end.kind == "bolted" else 0.0


# Gusset ----------------------------------------------------------------------------------


def _plate_area(given: Given) -> float:
    """Area of gusset that serves the end, mm²."""
    end, plate = given.end, given.end.plate
    gussets = seat(given.section, end).gussets * getattr(plate, "number", 1)
    if plate.shape is not None:
        return float(gussets) * _polygon([(in_mm(x), in_mm(y)) for x, y in plate.shape.corners])
    length, width = _served(given)
    if plate.width is not None:
        width = in_mm(plate.width)
    return float(gussets) * length * width


def _served(given: Given) -> tuple[float, float]:
    """Length of gusset along the member that serves the end, and the width the force spreads to."""
    end = given.end
    if end.kind == "bolted":
        joint = (end.per_line - 1) * in_mm(end.pitch) + in_mm(end.stagger)
        across = in_mm(end.line_spacing) * (end.lines - 1)
        beyond = in_mm(end.plate_end_distance or end.end_distance)
        width = across + 2 * SPREAD * joint
        return in_mm(end.end_distance) + joint + beyond, max(width, _least(given) + across)
    if end.kind == "bolted pattern":
        holes = [h for h in end.holes.holes if h.bolt and end.at_gusset(h.element)]
        xs, ys = [in_mm(h.x) for h in holes], [in_mm(h.y) for h in holes]
        joint, across = max(xs) - min(xs), max(ys) - min(ys)
        beyond = min(xs) if end.plate_end_distance is None else in_mm(end.plate_end_distance)
        width = across + 2 * SPREAD * joint
        return min(xs) + joint + beyond, max(width, _least(given) + across)
    b = seat(given.section, end).width
    if end.kind == "welded":
        length = max(in_mm(end.length_1), in_mm(end.length_2 or end.length_1))
        return length, b + 2 * SPREAD * length
    if end.kind == "welded runs":
        along = [x for run in end.runs for x in (in_mm(run.x_1), in_mm(run.x_2))]
        length = max(along) - min(along)
        return length, b + 2 * SPREAD * length
    beyond = in_mm(end.plate_edge_beyond)
    return 2 * beyond, 2 * beyond


def _least(given: Given) -> float:
    return LEAST_WIDTH * bolt(given.end.bolts).d_f


def _polygon(corners: list[tuple[float, float]]) -> float:
    turned = corners[1:] + corners[:1]
    return abs(sum(x * v - u * y for (x, y), (u, v) in zip(corners, turned, strict=True))) / 2


def _plate_mass(given: Given) -> float:
    return _plate_area(given) * in_mm(given.end.plate.thickness) * DENSITY


# Welded ----------------------------------------------------------------------------------


def _weld_volume(given: Given) -> float:
    """Weld metal in mm³: half the leg squared along each run, no allowance for convexity."""
    end = given.end
    if end.kind == "welded runs":
        runs = [run.as_run() for run in end.runs]
        volume = math.fsum(run.leg**2 / 2 * run.length for run in runs)
        return volume * _sides(given)
    if end.kind != "welded":
        return 0.0
    length = in_mm(end.length_1) + in_mm(end.length_2 or end.length_1)
    if end.to in ("slot", "bar"):
        length *= 2
    return in_mm(end.leg_size) ** 2 / 2 * (length + in_mm(end.transverse)) * _sides(given)


def _sides(given: Given) -> float:
    return float(seat(given.section, given.end).plies)


_BOLTED_PLATE = (
    "section",
    "end.to",
    "end.bolts",
    "end.lines",
    "end.per_line",
    "end.pitch",
    "end.line_spacing",
    "end.stagger",
    "end.end_distance",
    "end.plate_end_distance",
    "end.plate.shape",
    "end.plate.width",
)
_WELDED_PLATE = (
    "section",
    "end.to",
    "end.length_1",
    "end.length_2",
    "end.plate.shape",
    "end.plate.width",
)
_THICK = "end.plate.thickness"
_WHOLE = ("section", "end")

Terms = dict[str, Term]
# Terms of an end by its kind; "" for ends of every other kind, which are taken whole.
OF_END: dict[str, Terms] = {
    "bolted": {
        "bolts": Term(_bolts, ("end.to", "end.lines", "end.per_line")),
        "holes": Term(_holes, ("section", "end.to", "end.lines", "end.per_line")),
        "weld volume": Term(lambda given: 0.0, ()),
        "gusset area": Term(_plate_area, _BOLTED_PLATE),
        "gusset mass": Term(_plate_mass, (*_BOLTED_PLATE, _THICK)),
    },
    "welded": {
        "bolts": Term(lambda given: 0.0, ()),
        "holes": Term(lambda given: 0.0, ()),
        "weld volume": Term(
            _weld_volume,
            (
                "section",
                "end.to",
                "end.leg_size",
                "end.length_1",
                "end.length_2",
                "end.transverse",
            ),
        ),
        "gusset area": Term(_plate_area, _WELDED_PLATE),
        "gusset mass": Term(_plate_mass, (*_WELDED_PLATE, _THICK)),
    },
    "": {
        "bolts": Term(_bolts, _WHOLE),
        "holes": Term(_holes, _WHOLE),
        "weld volume": Term(_weld_volume, _WHOLE),
        "gusset area": Term(_plate_area, _WHOLE),
        "gusset mass": Term(_plate_mass, _WHOLE),
    },
}


def of_end(given: Any, name: str) -> float:
    """One quantity of an end, whatever its kind; `given` has its section and the end."""
    return OF_END[""][name].make(given)
