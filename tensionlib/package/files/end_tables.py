"""The tables of a design file for ends, gussets and what a member carries beside its tension.

Only functions that read or describe a design file import this module, since it loads pydantic.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import Annotated, Any, ClassVar, Literal

from pydantic import Discriminator, Field, Tag

from tensionlib.joints import holes, rod
from tensionlib.joints.ends import BOLTED_TO, WELDED_TO
from tensionlib.joints.gusset_shape import GussetShape
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.pattern_end import SHARES, TENSIONS
from tensionlib.joints.stated import EDGES, QUALITIES, THREADS
from tensionlib.joints.welded_runs import FilletRun
from tensionlib.members.beside import CATEGORIES, Across, Overstrength
from tensionlib.package.files.shaped import plate_of
from tensionlib.package.files.typed import (
    Line,
    Name,
    OtherForce,
    Pair,
    Part,
    StatedFactor,
    Table,
    Taken,
    above_zero,
    measured,
    one_of,
    plain_number,
    whole,
    zero_or_more,
)
from tensionlib.quantities import ANGLE, FORCE, LENGTH, STRESS, WEIGHT_PER_LENGTH, Quantity
from tensionlib.steel.bolts import SIZES

MOST_BOLTS = 100
"""In a line, or in a hanger: more than any joint has. A number mistyped is refused, not drawn."""

_LINE_LOAD = measured(WEIGHT_PER_LENGTH, "0.4 kN/m", at_least=0.0)


class HangerTable(Part):
    """The flange of a tee hung from its support by bolts in tension."""

    makes: ClassVar[Callable[..., object]] = Hanger

    bolts: Name = Field(examples=["M20 8.8/TB"])
    number: Annotated[int, whole(at_least=2, at_most=MOST_BOLTS)] = Field(examples=[4])
    gauge: Annotated[Quantity, above_zero("120 mm")]
    tributary: Annotated[Quantity, above_zero("80 mm")]
    thickness: Annotated[Quantity, above_zero("20 mm")]
    steel: Name = Field(examples=["AS/NZS 3678 250"])
    threads: Annotated[str, one_of(*THREADS)] = "in shear plane"
    angle: Annotated[Quantity | None, measured(ANGLE, "30 deg", at_least=0.0)] = None
    prying: Annotated[float, plain_number(at_least=0.0, at_most=2.0)] = 0.3


class ShapeTable(Part):
    """The gusset's own outline."""

    makes: ClassVar[Callable[..., object]] = GussetShape

    corners: list[Pair] = Field(
        description="in turn round the outline",
        examples=[[["0 mm", "0 mm"], ["420 mm", "0 mm"], ["420 mm", "240 mm"]]],
    )
    supported: list[Annotated[int, whole(at_least=0)]] = Field(
        description="edges that are held, counted from 0", examples=[[0]]
    )
    member_at: Pair = Field(
        description="where the member's end lies", examples=[["140 mm", "120 mm"]]
    )
    angle: Annotated[Quantity, measured(ANGLE, "40 deg")]


class GussetTable(Part):
    """The gusset an end is connected to, or cover plates where it states their number."""

    makes: ClassVar[Callable[..., object]] = staticmethod(plate_of)

    thickness: Annotated[Quantity, above_zero("12 mm")] = Field(examples=["12 mm"])
    steel: Name = Field(examples=["AS/NZS 3678 250"])
    width: Annotated[Quantity | None, above_zero("260 mm")] = None
    hanger: HangerTable | None = None
    shape: ShapeTable | None = None
    compression: Annotated[Quantity | None, OtherForce] = None
    free_length: Annotated[Quantity | None, above_zero("150 mm")] = None
    length_factor: Annotated[float, plain_number(above=0.0, at_most=5.0)] = 1.2
    support_leg: Annotated[Quantity | None, above_zero("6 mm")] = None
    support_quality: Annotated[str, one_of(*QUALITIES)] = "SP"
    number: Annotated[int | None, whole(at_most=2)] = Field(
        None, description="cover plates of a splice, in place of a gusset"
    )


_PLATE: Any = Field(examples=[{"thickness": "12 mm", "steel": "AS/NZS 3678 250"}])


class BoltedTable(Table):
    """A bolted end."""

    kind: Annotated[Literal["bolted"], one_of("bolted")]
    to: Annotated[str, one_of(*BOLTED_TO)] = Field(examples=["long leg"])
    bolts: Name = Field(examples=["M20 8.8/S"])
    threads: Annotated[str, one_of(*THREADS)] = Field(examples=["in shear plane"])
    per_line: Annotated[int, whole(at_most=MOST_BOLTS)] = Field(examples=[3])
    plate: GussetTable = _PLATE
    end_distance: Annotated[Quantity, above_zero("35 mm")] = Field(examples=["35 mm"])
    lines: Annotated[int, whole(at_most=2)] = 1
    pitch: Annotated[Quantity | None, above_zero("70 mm")] = None
    gauge: Annotated[Quantity | None, above_zero("55 mm")] = None
    line_spacing: Annotated[Quantity | None, above_zero("60 mm")] = None
    stagger: Annotated[Quantity | None, zero_or_more("35 mm")] = None
    plate_end_distance: Annotated[Quantity | None, above_zero("35 mm")] = None
    plate_edge_distance: Annotated[Quantity | None, above_zero("50 mm")] = None
    clearance: Annotated[Quantity | None, zero_or_more("2 mm")] = None
    edge_kind: Annotated[str, one_of(*EDGES)] = "sheared"
    packing: Annotated[Quantity | None, above_zero("8 mm")] = None
    slip_factor: Annotated[float, plain_number(above=0.0, at_most=1.0)] = 0.35
    k_te: StatedFactor = None
    k_te_reason: Line = ""


class HoleTable(Part):
    """One hole of a pattern."""

    makes: ClassVar[Callable[..., object]] = holes.Hole

    mark: Name = Field(examples=["7"])
    x: Annotated[Quantity, above_zero("60 mm")]
    y: Annotated[Quantity, above_zero("55 mm")]
    element: Line = ""
    bolt: bool = True
    kind: Annotated[str, one_of(*holes.KINDS)] = "standard"
    slot: Annotated[str, one_of(*holes.SLOTS)] = "along"
    diameter: Annotated[Quantity | None, above_zero("22 mm")] = None


class LinesTable(Part):
    """Lines of holes along the force."""

    makes: ClassVar[Callable[..., object]] = holes.Pattern.lines

    per_line: Annotated[int, whole(at_most=MOST_BOLTS)] = Field(examples=[3])
    at: list[Annotated[Quantity, above_zero("55 mm")]] = Field(examples=[["55 mm"]])
    end_distance: Annotated[Quantity, above_zero("40 mm")]
    pitch: Annotated[Quantity | None, above_zero("70 mm")] = None
    stagger: list[Annotated[Quantity, measured(LENGTH, "35 mm")]] = Field([])
    element: Line = ""
    first: Annotated[int, whole(at_least=0)] = 1


HOLE_TAG, LINES_TAG = "\x00hole", "\x00lines"


def are_lines(table: object) -> bool:
    """Whether an entry of `holes` stands for lines of them."""
    return isinstance(table, dict) and "per_line" in table


HolesTable = Annotated[
    Annotated[HoleTable, Tag(HOLE_TAG)] | Annotated[LinesTable, Tag(LINES_TAG)],
    Discriminator(lambda table: LINES_TAG if are_lines(table) else HOLE_TAG),
]


class PatternTable(Table):
    """A bolted end with any pattern of holes."""

    kind: Annotated[Literal["bolted pattern"], one_of("bolted pattern")]
    to: Annotated[str, one_of(*BOLTED_TO)]
    bolts: Name = Field(examples=["M20 8.8/S"])
    threads: Annotated[str, one_of(*THREADS)]
    holes: list[HolesTable] = Field(
        description="each one hole, or lines of them",
        examples=[[{"per_line": 3, "at": ["55 mm"], "end_distance": "40 mm", "pitch": "70 mm"}]],
    )
    plate: GussetTable = _PLATE
    plate_end_distance: Annotated[Quantity | None, above_zero("40 mm")] = None
    plate_edge_distance: Annotated[Quantity | None, above_zero("50 mm")] = None
    edge_kind: Annotated[str, one_of(*EDGES)] = "sheared"
    packing: Annotated[Quantity | None, above_zero("8 mm")] = None
    slip_factor: Annotated[float, plain_number(above=0.0, at_most=1.0)] = 0.35
    share: Annotated[str, one_of(*SHARES)] = "equal"
    credit_behind: bool = False
    block_tension: Annotated[str, one_of(*TENSIONS)] = "uniform"
    k_te: StatedFactor = None
    k_te_reason: Line = ""


class WeldedTable(Table):
    """A welded end."""

    kind: Annotated[Literal["welded"], one_of("welded")]
    to: Annotated[str, one_of(*WELDED_TO)] = Field(examples=["long leg"])
    leg_size: Annotated[Quantity, above_zero("6 mm")] = Field(examples=["6 mm"])
    plate: GussetTable = _PLATE
    length_1: Annotated[Quantity, above_zero("120 mm")] = Field(examples=["120 mm"])
    length_2: Annotated[Quantity | None, above_zero("120 mm")] = None
    transverse: Annotated[Quantity | None, above_zero("90 mm")] = None
    quality: Annotated[str, one_of(*QUALITIES)] = "SP"
    metal: Name = "E48XX"
    slot_clearance: Annotated[Quantity | None, zero_or_more("3 mm")] = None
    shear_lag_by_length: bool = False
    k_te: StatedFactor = None
    k_te_reason: Line = ""


class RunTable(Part):
    """One straight run of fillet weld, from one end to the other."""

    makes: ClassVar[Callable[..., object]] = FilletRun

    mark: Name = Field(examples=["a"])
    x_1: Annotated[Quantity, zero_or_more("0 mm")]
    y_1: Annotated[Quantity, zero_or_more("0 mm")]
    x_2: Annotated[Quantity, zero_or_more("120 mm")]
    y_2: Annotated[Quantity, zero_or_more("0 mm")]
    leg_size: Annotated[Quantity, above_zero("6 mm")]


class RunsTable(Table):
    """A welded end of any runs of fillet weld."""

    kind: Annotated[Literal["welded runs"], one_of("welded runs")]
    to: Annotated[str, one_of(*(name for name in BOLTED_TO if name != "both flanges"))]
    runs: list[RunTable] = Field(
        examples=[
            [
                {
                    "mark": "a",
                    "x_1": "0 mm",
                    "y_1": "0 mm",
                    "x_2": "120 mm",
                    "y_2": "0 mm",
                    "leg_size": "6 mm",
                }
            ]
        ]
    )
    plate: GussetTable = _PLATE
    quality: Annotated[str, one_of(*QUALITIES)] = "SP"
    metal: Name = "E48XX"
    k_te: StatedFactor = None
    k_te_reason: Line = ""


class PinnedTable(Table):
    """A flat with an eye in its end, on a pin between two fork plates."""

    kind: Annotated[Literal["pinned"], one_of("pinned")]
    pin: Annotated[Quantity, above_zero("40 mm")]
    pin_f_y: Annotated[Quantity, measured(STRESS, "350 MPa", above=0.0)]
    hole: Annotated[Quantity, above_zero("41 mm")]
    edge_beyond: Annotated[Quantity, above_zero("80 mm")]
    plate: GussetTable = _PLATE
    plate_edge_beyond: Annotated[Quantity, above_zero("80 mm")]
    eye_width: Annotated[Quantity | None, above_zero("160 mm")] = None
    gap: Annotated[Quantity | None, zero_or_more("2 mm")] = None
    rotates: bool = False
    to: Annotated[str, one_of("plate")] = "plate"
    k_te: StatedFactor = None
    k_te_reason: Line = ""


class RodTable(Table):
    """The threaded end of a round bar, in a bought fork on a lug."""

    kind: Annotated[Literal["rod"], one_of("rod")]
    thread: Annotated[str, one_of(*SIZES)] = Field(examples=["M24"])
    fork_capacity: Annotated[Quantity, measured(FORCE, "120 kN", above=0.0)]
    certified_by: Name = Field(examples=["the maker's certificate"])
    pin: Annotated[Quantity, above_zero("24 mm")]
    hole: Annotated[Quantity, above_zero("26 mm")]
    plate: GussetTable = _PLATE
    plate_edge_beyond: Annotated[Quantity, above_zero("50 mm")]
    coupling: Annotated[str, one_of(*rod.COUPLINGS)] = "none"
    sleeve_diameter: Annotated[Quantity | None, above_zero("50 mm")] = None
    sleeve_steel: Name = ""
    engagement: Annotated[Quantity | None, above_zero("30 mm")] = None
    bracing: bool = True
    to: Annotated[str, one_of("rod")] = "rod"
    k_te: StatedFactor = None
    k_te_reason: Line = ""


EndTables = BoltedTable | PatternTable | WeldedTable | RunsTable | PinnedTable | RodTable
BY_KIND: dict[str, type[EndTables]] = {
    "bolted": BoltedTable,
    "bolted pattern": PatternTable,
    "welded": WeldedTable,
    "welded runs": RunsTable,
    "pinned": PinnedTable,
    "rod": RodTable,
}

# A control character keeps the tags apart from every key a file may hold.
NAME_TAG = "\x00name"
TAGS = (NAME_TAG, HOLE_TAG, LINES_TAG, *(f"\x00{kind}" for kind in BY_KIND))


def _tag(value: object) -> str | None:
    if isinstance(value, str):
        return NAME_TAG
    kind = value.get("kind") if isinstance(value, dict) else None
    return f"\x00{kind}" if isinstance(kind, str) and kind in BY_KIND else None


EndTable = Annotated[
    Annotated[BoltedTable, Tag("\x00bolted")]
    | Annotated[PatternTable, Tag("\x00bolted pattern")]
    | Annotated[WeldedTable, Tag("\x00welded")]
    | Annotated[RunsTable, Tag("\x00welded runs")]
    | Annotated[PinnedTable, Tag("\x00pinned")]
    | Annotated[RodTable, Tag("\x00rod")],
    Discriminator(_tag),
]
EndReference = Annotated[
    Annotated[Name, Tag(NAME_TAG)]
    | Annotated[BoltedTable, Tag("\x00bolted")]
    | Annotated[PatternTable, Tag("\x00bolted pattern")]
    | Annotated[WeldedTable, Tag("\x00welded")]
    | Annotated[RunsTable, Tag("\x00welded runs")]
    | Annotated[PinnedTable, Tag("\x00pinned")]
    | Annotated[RodTable, Tag("\x00rod")],
    Discriminator(_tag),
]


class AcrossTable(Part):
    """Loads across the member and offsets of its force."""

    makes: ClassVar[Callable[..., object]] = Across

    span: Annotated[Quantity | None, above_zero("4 m")] = None
    self_weight: bool = True
    weight_factor: Annotated[float, plain_number(above=0.0, at_most=2.0)] = 1.2
    load: Annotated[Quantity | None, _LINE_LOAD] = None
    side_load: Annotated[Quantity | None, _LINE_LOAD] = None
    offset_x: Annotated[Quantity | None, zero_or_more("12 mm")] = None
    offset_y: Annotated[Quantity | None, zero_or_more("12 mm")] = None
    sag_limit: Annotated[Quantity | None, above_zero("10 mm")] = None
    stretch_limit: Annotated[Quantity | None, above_zero("10 mm")] = None


class OverstrengthTable(Part):
    """A brace that yields in an earthquake."""

    makes: ClassVar[Callable[..., object]] = Overstrength

    category: Annotated[str, one_of(*CATEGORIES)]
    factor: Annotated[float | None, plain_number(at_least=1.0, at_most=5.0)] = None
    bearing_factor: Annotated[float | None, plain_number(above=0.0, at_most=5.0)] = None


def example_of(table: type[Table], key: str) -> object:
    """What a message offers for a key that is missing; None where the model has no example."""
    field = table.model_fields[key]
    if field.examples:
        return field.examples[0]
    for each in field.metadata:
        if isinstance(each, Taken):
            return next(iter(each.json.get("examples") or each.json.get("enum") or ()), None)
    return None
