"""Where AS 4100 and NZS 3404 part: what the common walk asks of the standard it walks."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working

# The end's inputs; bolt diameter, thickness and tensile strength of the ply; the symbol and the
# title of the line.
Bearing = Callable[[Working, Inputs, Entry, Entry, Entry, str, str], Entry]
# The member's inputs and its nominal capacity in gross yielding; gives the action, if any.
Overstrength = Callable[[Working, Inputs, Entry], Entry | None]


@dataclass(frozen=True)
class Factors:
    """Capacity factors and the table that gives them."""

    clause: str
    member: float
    component: float
    bolt: float
    pin: float
    ply: float
    slip: float
    fillet: Mapping[str, float]


@dataclass(frozen=True)
class BlockRule:
    """What the standard says of block shear: clause, capacity factor, how known, and a word."""

    clause: str
    phi: float
    known: str
    note: str


@dataclass(frozen=True)
class Rules:
    """One standard's answers.

    `k_t` is the symbol under which the standard writes the correction factor; `slip_clause` is
    where it gives the capacity factor for slip; `bearing` writes the nominal bearing capacity of
    a ply at one bolt; `overstrength` writes the action of a brace that yields in an earthquake,
    None where the standard leaves that to another. `class_10_9` is the factor on bolts of that
    class with threads in the shear plane, None where the edition has no such bolts.
    """

    name: str
    factors: Factors
    k_t: str
    slip_clause: str
    bearing: Bearing
    overstrength: Overstrength | None
    class_10_9: float | None
    block: BlockRule
    not_checked: tuple[str, ...]


NOT_CHECKED = (
    "the members and supports the gussets are fixed to; the gussets' own fixing, unless the weld to"
    " the support or the hanger is stated",
    "block shear of a regular pattern in any block but those shown; to the gusset's side edge only"
    " where it is stated",
    "shear of a tube's or an element's own wall beside its welds",
    "compression in the member when the force reverses; in the gusset, unless it is stated there",
    "bending from self-weight, lateral load or eccentricity the correction factor does not cover,"
    " unless loads across the member are stated",
    "earthquake, unless the brace's overstrength is stated; the detailing that its category asks"
    " for in any case",
    "bolt tension and prying, unless a hanger is stated; slip of bolts that are not friction bolts",
    "fatigue, brittle fracture, fire, corrosion and durability",
    "vibration; stretch and sag beyond what is printed",
    "erection, access for tools beyond what is printed, and tolerance of the fabricated work",
)
