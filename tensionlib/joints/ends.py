"""End connections as the user states them: bolted or welded to a gusset.

Every dimension is a quantity. A dimension left out takes the standard's or the common value and
is printed as an assumption by the calculation.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any, ClassVar

from tensionlib.errors import InputError
from tensionlib.joints.gusset_shape import GussetShape
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.stated import (
    EDGES,
    QUALITIES,
    THREADS,
    Length,
    Stated,
    factor_door,
    in_mm,
    length_door,
    named_door,
    reason_given,
    word_door,
)
from tensionlib.quantities import FORCE, Quantity, count, door, factor

BOLTED_TO = ("long leg", "short leg", "leg", "web", "flange", "both flanges", "plate")
WELDED_TO = (*BOLTED_TO, "slot", "bar")


Force = Quantity | str


def _hanger_door(name: str, value: Any) -> Any:
    if value is not None and not isinstance(value, Hanger):
        raise InputError(f"{name}: got {value!r}; a Hanger(...) is due")
    return value


@dataclass(frozen=True)
class Gusset(Stated):
    """A gusset plate.

    Parameters
    ----------
    thickness : length
    steel : str
        Plate grade, for example "AS/NZS 3678 250".
    width : length, optional
        Width of plate there is across the force at the last bolts or the end of the weld. It
        clips the width to which the force spreads; without it the plate is taken as wide enough
        and the calculation says so.
    hanger : Hanger, optional
        Where the gusset is the stem of a tee hung from its support by bolts in tension.
    shape : GussetShape, optional
        The gusset's own outline: the spread is clipped by its edges, tear-out runs to them, its
        free edges and its support are known.
    compression : force, optional
        Compression in the member when the force reverses: the gusset is proven for it too.
    free_length : length, optional
        Of the strip from the joint to the support; from the outline where there is one.
    length_factor : number
        Effective length of that strip over its free length, 1.2 unless given.
    support_leg : length, optional
        Leg of the fillets, on both faces, that weld the outline's one supported edge to its
        support.
    support_quality : str
        "SP" or "GP".
    """

    thickness: Length
    steel: str
    width: Length | None = None
    hanger: Hanger | None = None
    shape: GussetShape | None = None
    compression: Force | None = None
    free_length: Length | None = None
    length_factor: float = 1.2
    support_leg: Length | None = None
    support_quality: str = "SP"

    DOORS: ClassVar = {
        "thickness": length_door("12 mm", due=True),
        "width": length_door("260 mm"),
        "free_length": length_door("150 mm"),
        "support_leg": length_door("6 mm"),
        "support_quality": word_door(QUALITIES),
        "length_factor": lambda name, value: factor(name, value, above=0.0, at_most=5.0),
        "compression": lambda name, value: (
            None if value is None else door(name, value, FORCE, at_least=0.0, example="120 kN")
        ),
        "hanger": _hanger_door,
        "steel": named_door("AS/NZS 3678 250", "name a grade"),
    }

    def __post_init__(self) -> None:
        self._pass_doors()
        if self.shape is not None and not isinstance(self.shape, GussetShape):
            raise InputError(f"shape: got {self.shape!r}; a GussetShape(...) is due")
        if self.shape is None and self.support_leg is not None:
            raise InputError("support_leg: given without the gusset's shape, which has the support")


def check_plate(plate: object) -> None:
    """Refuse what is no gusset. Raises InputError naming what is due."""
    if type(plate) is not Gusset:
        raise InputError(
            f"plate: got {plate!r}; a Gusset is due, for example"
            " Gusset('12 mm', 'AS/NZS 3678 250') (cover plates go with a BoltedPattern)"
        )


def _lines_door(name: str, value: Any) -> int:
    number = count(name, value, at_least=1)
    if number > 2:
        raise InputError(f"{name}: got {value}; 1 or 2 lines of bolts are accepted")
    return number


# What does not go together, and the fields of the end it lies in.


def _pitch_due(end: Any) -> None:
    if end.per_line > 1 and end.pitch is None:
        raise InputError("pitch: missing; two or more bolts a line need it, for example '70 mm'")


def _lines_agree(end: Any) -> None:
    if end.lines == 2 and end.line_spacing is None:
        raise InputError("line_spacing: missing; two lines of bolts need it, for example '60 mm'")
    if end.lines == 1 and in_mm(end.stagger) > 0.0:
        raise InputError("stagger: given for one line of bolts; it needs lines=2")
    if end.lines == 1 and end.line_spacing is not None:
        raise InputError("line_spacing: given for one line of bolts; it needs lines=2")


def _gauge_due(end: Any) -> None:
    if end.to in ("long leg", "short leg", "leg") and end.gauge is None:
        raise InputError(
            "gauge: missing; an angle's bolts need the distance from its heel, for example '55 mm'"
        )


def _slot_agrees(end: Any) -> None:
    if (end.to == "slot") != (end.slot_clearance is not None):
        raise InputError(
            "slot_clearance: missing; a slotted tube needs it, for example '3 mm'"
            if end.to == "slot"
            else f"slot_clearance: given for an end welded to {end.to!r}; it needs to='slot'"
        )
    if end.shear_lag_by_length and (end.to != "slot" or end.k_te is not None):
        raise InputError(
            "shear_lag_by_length: it is for an end welded to 'slot' without a stated k_te"
        )


def _transverse_agrees(end: Any) -> None:
    if end.transverse is not None and end.to in ("slot", "bar", "both flanges"):
        raise InputError(
            f"transverse: given for an end welded to {end.to!r}; a run across the end is"
            " accepted on a leg, web, flange or plate"
        )


Agree = tuple[Callable[[Any], None], tuple[str, ...]]
_REASON: Agree = (reason_given, ("k_te", "k_te_reason"))
AGREE_BOLTED: tuple[Agree, ...] = (
    (_pitch_due, ("per_line", "pitch")),
    (_lines_agree, ("lines", "line_spacing", "stagger")),
    (_gauge_due, ("to", "gauge")),
    _REASON,
)
AGREE_WELDED: tuple[Agree, ...] = (
    (_slot_agrees, ("to", "slot_clearance", "shear_lag_by_length", "k_te")),
    (_transverse_agrees, ("to", "transverse")),
    _REASON,
)


@dataclass(frozen=True)
class Bolted(Stated):
    """A bolted end: one or two lines of bolts through one element of the section.

    Parameters
    ----------
    to : str
        The element the bolts go through: "long leg", "short leg" or "leg" of an angle, "web" of a
        channel, I or tee, "flange" of a tee, "both flanges" of an I or channel, "plate" of a flat.
    bolts : str
        Size, grade and category, for example "M20 8.8/S".
    threads : str
        "in shear plane" or "out of shear plane".
    per_line : int
        Bolts in each line along the force.
    plate : Gusset
    lines : int
        1 or 2. For both flanges: lines in each flange.
    pitch : length
        Bolt to bolt along a line; due for more than one bolt a line.
    gauge : length
        Heel of an angle to its first line; due for an angle. On other elements the lines stand
        symmetrical about the middle of the element.
    line_spacing : length
        Line to line across the force; due for two lines.
    stagger : length
        How far the second line stands back from the first along the force; 0 for straight lines.
    end_distance : length
        Centre of the end bolt to the end of the member.
    plate_end_distance : length, optional
        Centre of the last bolt to the edge of the gusset that lies across the member; taken as
        `end_distance` unless given.
    plate_edge_distance : length, optional
        Centre of the outer bolt to the side edge of the gusset, across the force.
    clearance : length, optional
        Hole diameter less bolt diameter; the standard's unless given.
    packing : length, optional
        Thickness of the packing plates in a shear plane, where there are any.
    slip_factor : number
        Slip factor of the faying surfaces, for tensioned friction bolts (TF): 0.35 for clean
        as-rolled surfaces (from memory); others by test.
    edge_kind : str
        How the member's end and the gusset's edges are cut: "sheared" (or hand flame cut),
        "machine cut" (machine flame cut, sawn or planed) or "rolled".
    k_te : number, optional
        Correction factor stated by the engineer where the standard's table has no row for the
        case; printed with `k_te_reason`.
    """

    to: str
    bolts: str
    threads: str
    per_line: int
    plate: Gusset
    end_distance: Length
    lines: int = 1
    pitch: Length | None = None
    gauge: Length | None = None
    line_spacing: Length | None = None
    stagger: Length | None = None
    plate_end_distance: Length | None = None
    plate_edge_distance: Length | None = None
    clearance: Length | None = None
    edge_kind: str = "sheared"
    packing: Length | None = None
    slip_factor: float = 0.35
    k_te: float | None = None
    k_te_reason: str = ""
    kind: ClassVar[str] = "bolted"

    DOORS: ClassVar = {
        "to": word_door(BOLTED_TO),
        "threads": word_door(THREADS),
        "edge_kind": word_door(EDGES),
        "bolts": named_door("M20 8.8/S", "name them"),
        "per_line": lambda name, value: count(name, value, at_least=1),
        "lines": _lines_door,
        "pitch": length_door("70 mm"),
        "gauge": length_door("55 mm"),
        "line_spacing": length_door("60 mm"),
        "plate_end_distance": length_door("35 mm"),
        "plate_edge_distance": length_door("50 mm"),
        "end_distance": length_door("35 mm", due=True),
        "stagger": length_door("35 mm", at_least=0.0),
        "clearance": length_door("2 mm", at_least=0.0),
        "packing": length_door("8 mm"),
        "slip_factor": lambda name, value: factor(name, value, above=0.0, at_most=1.0),
        "k_te": factor_door(above=0.0, at_most=1.0),
    }

    def __post_init__(self) -> None:
        check_plate(self.plate)
        self._pass_doors()
        for agree, _ in AGREE_BOLTED:
            agree(self)


def _flag_door(name: str, value: Any) -> bool:
    if not isinstance(value, bool):
        raise InputError(f"{name}: got {value!r}; True or False is due")
    return value


@dataclass(frozen=True)
class Welded(Stated):
    """A welded end: longitudinal fillets along both sides, and one across the end if wanted.

    Parameters
    ----------
    to : str
        The element on the gusset: as `Bolted`, or "slot" of a tube slotted over the gusset (four
        runs), or "bar" of a round bar laid in a slot of the gusset (four runs).
    leg_size : length
        Fillet leg size.
    plate : Gusset
    length_1 : length
        Length of the run along the heel of an angle, or along the first side.
    length_2 : length
        Length of the run along the other side; the same as `length_1` unless given.
    transverse : length, optional
        Length of the run across the member's end.
    quality : str
        "SP" or "GP".
    metal : str
        Weld metal, for example "E48XX".
    slot_clearance : length, optional
        Width of the slots in a tube over the gusset's thickness; due for "slot".
    shear_lag_by_length : bool
        For a slotted tube, whose case the tables of AS 4100 and NZS 3404 do not have: take the
        correction factor as 1 - x/l of AISC 360-16 Table D3.1, cases 5 and 6; printed as such.
    k_te : number, optional
        Correction factor stated by the engineer where the standard's table has no row for the
        case (a slotted tube); printed with `k_te_reason`.
    """

    to: str
    leg_size: Length
    plate: Gusset
    length_1: Length
    length_2: Length | None = None
    transverse: Length | None = None
    quality: str = "SP"
    metal: str = "E48XX"
    slot_clearance: Length | None = None
    shear_lag_by_length: bool = False
    k_te: float | None = None
    k_te_reason: str = ""
    kind: ClassVar[str] = "welded"

    DOORS: ClassVar = {
        "to": word_door(WELDED_TO),
        "quality": word_door(QUALITIES),
        "metal": named_door("E48XX"),
        "leg_size": length_door("6 mm", due=True),
        "length_1": length_door("120 mm", due=True),
        "length_2": length_door("120 mm"),
        "transverse": length_door("90 mm"),
        "slot_clearance": length_door("3 mm", at_least=0.0),
        "shear_lag_by_length": _flag_door,
        "k_te": factor_door(above=0.0, at_most=1.0),
    }

    def __post_init__(self) -> None:
        check_plate(self.plate)
        self._pass_doors()
        if self.length_2 is None:
            object.__setattr__(self, "length_2", self.length_1)
        for agree, _ in AGREE_WELDED:
            agree(self)
