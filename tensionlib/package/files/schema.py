"""The tables of a design file as pydantic models, and the JSON Schema that is made of them.

Only functions that read or describe a design file import this module, since it loads pydantic.
Run as ``python -m tensionlib.package.files.schema docs/design-file.schema.json`` it writes the
schema anew.
"""

from __future__ import annotations

import datetime
import json
import math
import sys
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path
from typing import Annotated, Any, Literal

from pydantic import (
    AfterValidator,
    BaseModel,
    BeforeValidator,
    ConfigDict,
    Discriminator,
    Field,
    GetCoreSchemaHandler,
    GetJsonSchemaHandler,
    Tag,
    ValidationInfo,
)
from pydantic.json_schema import GenerateJsonSchema, JsonSchemaValue
from pydantic_core import CoreSchema, core_schema

from tensionlib.errors import InputError, UnitError, did_you_mean
from tensionlib.joints.ends import BOLTED_TO, WELDED_TO
from tensionlib.joints.stated import EDGES, QUALITIES, THREADS
from tensionlib.package.files.fields import (
    FORCE_EXAMPLE,
    LENGTH_EXAMPLE,
    named,
    take_force,
    take_length,
    take_length_or_zero,
    text_block,
    text_line,
)
from tensionlib.package.files.problems import reason_of, shown
from tensionlib.quantities import Quantity, count, factor

STATUSES = ("draft", "issued")
PAPERS = ("A4", "Letter")

# A control character keeps these apart from every key a file may hold.
NAME_TAG, BOLTED_TAG, WELDED_TAG = "\x00name", "\x00bolted", "\x00welded"
SHAPED_TAG = "\x00shaped"
TAGS = (NAME_TAG, BOLTED_TAG, WELDED_TAG, SHAPED_TAG)
SHAPED = ("bolted pattern", "welded runs", "pinned", "rod")


@dataclass(frozen=True, eq=False)
class Taken:
    """A field taken by a function of its name and value, with its own JSON Schema."""

    take: Callable[[str, Any], object]
    json: dict[str, Any]

    def _read(self, value: Any, info: ValidationInfo) -> object:
        name = str(info.field_name)
        try:
            return self.take(name, value)
        except (UnitError, InputError) as error:
            raise InputError(reason_of(error, name)) from None

    def __get_pydantic_core_schema__(
        self, source: object, handler: GetCoreSchemaHandler
    ) -> CoreSchema:
        return core_schema.with_info_plain_validator_function(self._read)

    def __get_pydantic_json_schema__(
        self, schema: CoreSchema, handler: GetJsonSchemaHandler
    ) -> JsonSchemaValue:
        return dict(self.json)


def one_of(*accepted: str) -> Taken:
    """Text that is one of a few words."""

    def take(name: str, value: Any) -> str:
        if not isinstance(value, str) or value not in accepted:
            raise InputError(
                f"got {shown(value)}; one of {', '.join(map(repr, accepted))} is due."
                + (did_you_mean(value, accepted) if isinstance(value, str) else "")
            )
        return value

    return Taken(take, {"type": "string", "enum": list(accepted)})


def above_zero(example: str) -> Taken:
    """A length above zero as text with its unit."""
    json = {"type": "string", "description": "a length with its unit", "examples": [example]}
    return Taken(lambda name, value: take_length(name, value, example), json)


def zero_or_more(example: str) -> Taken:
    """A length of zero or more as text with its unit."""
    json = {
        "type": "string",
        "description": "a length with its unit, zero or more",
        "examples": [example],
    }
    return Taken(lambda name, value: take_length_or_zero(name, value, example), json)


def whole(at_most: int | None = None) -> Taken:
    """A whole number from 1."""
    json = {"type": "integer", "minimum": 1} | ({"maximum": at_most} if at_most else {})
    return Taken(lambda name, value: count(name, value, at_most=at_most), json)


def _name(name: str, value: Any) -> str:
    if not isinstance(value, str):
        raise InputError(f"got {shown(value)}; text in quotation marks is due")
    return named(value)


def _option(name: str, value: Any) -> str | int | float | bool:
    if isinstance(value, str):
        return text_line(value)
    if isinstance(value, int | float) and math.isfinite(value):
        return value
    raise InputError(f"got {shown(value)}; text, a finite number, true or false is due")


def _date(value: object) -> object:
    """A date of TOML as text; text stays."""
    if isinstance(value, datetime.date) and not isinstance(value, datetime.datetime):
        return value.isoformat()
    return value


def _length_factor(name: str, value: Any) -> float:
    return factor(name, value, above=0.0, at_most=5.0)


def _slip_factor(name: str, value: Any) -> float:
    return factor(name, value, above=0.0, at_most=1.0)


_FORCE_JSON = {
    "type": "string",
    "description": "a force with its unit, zero or more",
    "examples": [FORCE_EXAMPLE],
}

Block = Annotated[str, AfterValidator(text_block)]
Line = Annotated[str, AfterValidator(text_line)]
Name = Annotated[str, Taken(_name, {"type": "string", "minLength": 1, "pattern": "\\S"})]
Date = Annotated[str, BeforeValidator(_date), AfterValidator(text_line)]
Force = Annotated[
    Quantity,
    Taken(
        take_force,
        {
            "type": "string",
            "description": "design tension force with its unit, zero or more",
            "examples": [FORCE_EXAMPLE],
        },
    ),
]
StatedFactor = Annotated[
    float | None,
    Taken(
        lambda name, value: factor(name, value, above=0.0, at_most=1.0),
        {"type": "number", "exclusiveMinimum": 0, "maximum": 1},
    ),
]
Option = Annotated[
    str | int | float | bool, Taken(_option, {"type": ["string", "number", "boolean"]})
]


class Table(BaseModel):
    """A table of the file: its keys are known, and nothing is turned from one kind to another."""

    model_config = ConfigDict(extra="forbid", strict=True, frozen=True)


class RevisionTable(Table):
    """One row of the revision table."""

    revision: Name = Field(examples=["A"])
    date: Date = Field(examples=["2025-03-14"])
    description: Block = Field(examples=["Issued for construction"])
    made_by: Line = ""
    checked_by: Line = ""


class ProjectTable(Table):
    """The job, as the cover and the document control table print it."""

    job_number: Name = Field(examples=["J-104"])
    title: Name = Field(examples=["Walkway canopy bracing"])
    client: Line = ""
    site: Line = ""
    made_by: Line = ""
    checked_by: Line = ""
    approved_by: Line = ""
    status: Annotated[str, one_of(*STATUSES)] = Field(
        "draft", description="an issued file states its revision, its date and who made it"
    )
    revision: Line = ""
    date: Date = ""
    paper: Annotated[str, one_of(*PAPERS)] = "A4"
    notes: list[Block] = []
    revisions: list[RevisionTable] = []


class StandardTable(Table):
    """The standard the members are designed to."""

    name: Name = Field(examples=["NZS 3404"])
    options: dict[str, Option] = Field({}, description="passed to the standard as they are")


class GussetTable(Table):
    """The gusset an end is connected to."""

    thickness: Annotated[Quantity, above_zero("12 mm")] = Field(examples=["12 mm"])
    steel: Name = Field(examples=["AS/NZS 3678 250"])
    width: Annotated[Quantity | None, above_zero("260 mm")] = None
    hanger: dict[str, Any] | None = Field(
        None, description="the flange of a tee hung by bolts in tension"
    )
    shape: dict[str, Any] | None = Field(None, description="the gusset's own outline")
    compression: Annotated[Quantity | None, Taken(take_force, _FORCE_JSON)] = None
    free_length: Annotated[Quantity | None, above_zero("150 mm")] = None
    length_factor: Annotated[float, Taken(_length_factor, {"type": "number"})] = 1.2
    support_leg: Annotated[Quantity | None, above_zero("6 mm")] = None
    support_quality: Annotated[str, one_of(*QUALITIES)] = "SP"
    number: Annotated[int | None, whole(at_most=2)] = Field(
        None, description="cover plates of a splice, in place of a gusset"
    )


class BoltedTable(Table):
    """A bolted end."""

    kind: Annotated[Literal["bolted"], one_of("bolted")]
    to: Annotated[str, one_of(*BOLTED_TO)] = Field(examples=["long leg"])
    bolts: Name = Field(examples=["M20 8.8/S"])
    threads: Annotated[str, one_of(*THREADS)] = Field(examples=["in shear plane"])
    per_line: Annotated[int, whole()] = Field(examples=[3])
    plate: GussetTable = Field(examples=[{"thickness": "12 mm", "steel": "AS/NZS 3678 250"}])
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
    slip_factor: Annotated[float, Taken(_slip_factor, {"type": "number"})] = 0.35
    k_te: StatedFactor = None
    k_te_reason: Line = ""


class WeldedTable(Table):
    """A welded end."""

    kind: Annotated[Literal["welded"], one_of("welded")]
    to: Annotated[str, one_of(*WELDED_TO)] = Field(examples=["long leg"])
    leg_size: Annotated[Quantity, above_zero("6 mm")] = Field(examples=["6 mm"])
    plate: GussetTable = Field(examples=[{"thickness": "12 mm", "steel": "AS/NZS 3678 250"}])
    length_1: Annotated[Quantity, above_zero("120 mm")] = Field(examples=["120 mm"])
    length_2: Annotated[Quantity | None, above_zero("120 mm")] = None
    transverse: Annotated[Quantity | None, above_zero("90 mm")] = None
    quality: Annotated[str, one_of(*QUALITIES)] = "SP"
    metal: Name = "E48XX"
    slot_clearance: Annotated[Quantity | None, zero_or_more("3 mm")] = None
    shear_lag_by_length: bool = False
    k_te: StatedFactor = None
    k_te_reason: Line = ""


class ShapedTable(BaseModel):
    """An end of another kind; its own class checks its fields."""

    model_config = ConfigDict(extra="allow", strict=True, frozen=True)

    kind: Annotated[str, one_of(*SHAPED)]
    plate: GussetTable = Field(examples=[{"thickness": "12 mm", "steel": "AS/NZS 3678 250"}])


def _tag(value: object) -> str | None:
    if isinstance(value, str):
        return NAME_TAG
    kind = value.get("kind") if isinstance(value, dict) else None
    if not isinstance(kind, str):
        return None
    tags = {"bolted": BOLTED_TAG, "welded": WELDED_TAG} | dict.fromkeys(SHAPED, SHAPED_TAG)
    return tags.get(kind)


EndTable = Annotated[
    Annotated[BoltedTable, Tag(BOLTED_TAG)]
    | Annotated[WeldedTable, Tag(WELDED_TAG)]
    | Annotated[ShapedTable, Tag(SHAPED_TAG)],
    Discriminator(_tag),
]
EndReference = Annotated[
    Annotated[Name, Tag(NAME_TAG)]
    | Annotated[BoltedTable, Tag(BOLTED_TAG)]
    | Annotated[WeldedTable, Tag(WELDED_TAG)]
    | Annotated[ShapedTable, Tag(SHAPED_TAG)],
    Discriminator(_tag),
]


class MemberTable(Table):
    """A member: `end` when both ends are alike, else `start_end` and `far_end`."""

    mark: Name = Field(examples=["RB1"])
    title: Block = ""
    section: Name = Field(examples=["150x90x10 UA"])
    steel: Name = Field(examples=["AS/NZS 3679.1 300"])
    length: Annotated[Quantity, above_zero(LENGTH_EXAMPLE)] = Field(examples=[LENGTH_EXAMPLE])
    force: Force = Field(examples=[FORCE_EXAMPLE])
    end: EndReference | None = None
    start_end: EndReference | None = None
    far_end: EndReference | None = None
    standard: Line = Field("", description="for this member alone, in place of the project's")
    service_force: Annotated[Quantity | None, Taken(take_force, _FORCE_JSON)] = None
    ties: Annotated[Quantity | None, above_zero("1500 mm")] = None
    across: dict[str, Any] | None = Field(None, description="loads across the member")
    overstrength: dict[str, Any] | None = Field(
        None, description="a brace that yields in an earthquake"
    )


class ColumnsTable(Table):
    """The header that the file has for a column of this library."""

    mark: Name = ""
    title: Name = ""
    section: Name = ""
    steel: Name = ""
    length: Name = ""
    force: Name = ""
    service_force: Name = ""
    end: Name = ""
    end_1: Name = ""
    end_2: Name = ""
    standard: Name = ""


class DefaultsTable(Table):
    """What an empty cell or a missing column stands for."""

    title: Name = ""
    section: Name = ""
    steel: Name = ""
    length: Annotated[Quantity | None, above_zero(LENGTH_EXAMPLE)] = None
    end: Name = ""
    end_1: Name = ""
    end_2: Name = ""
    standard: Name = ""


class ScheduleTable(Table):
    """The file that holds the schedule, and how its columns are called."""

    file: Name = Field(
        description="in the design file's folder or below it, written with '/'",
        examples=["members.csv"],
    )
    sheet: Line = Field("", description="of a workbook; the first one unless given")
    columns: ColumnsTable = ColumnsTable()
    ignore: list[Name] = Field([], description="headers of the file that are not read")
    defaults: DefaultsTable = DefaultsTable()


class DesignFileTables(Table):
    """A design file of tensionlib, written in TOML."""

    project: ProjectTable
    standard: StandardTable
    ends: dict[str, EndTable] = Field(
        {}, description="end connections by the names that members call them by"
    )
    members: list[MemberTable] = []
    schedule: ScheduleTable | None = None


class _WithoutNull(GenerateJsonSchema):
    """TOML has no null: a key is there or it is not. Keys need no titles besides."""

    def field_title_should_be_set(self, schema: Any) -> bool:
        return False

    def nullable_schema(self, schema: core_schema.NullableSchema) -> JsonSchemaValue:
        return self.generate_inner(schema["schema"])

    def default_schema(self, schema: core_schema.WithDefaultSchema) -> JsonSchemaValue:
        if schema.get("default") is None:
            return self.generate_inner(schema["schema"])
        return super().default_schema(schema)


def design_file_schema() -> dict[str, Any]:
    """The JSON Schema (draft 2020-12) of a design file read as data."""
    made = DesignFileTables.model_json_schema(schema_generator=_WithoutNull)
    return {
        "$schema": "https://json-schema.org/draft/2020-12/schema",
        **made,
        "title": "tensionlib design file",
    }


def schema_text() -> str:
    """The schema as docs/design-file.schema.json holds it."""
    return json.dumps(design_file_schema(), indent=2, ensure_ascii=False) + "\n"


if __name__ == "__main__":
    Path(sys.argv[1]).write_text(schema_text(), encoding="utf-8")
