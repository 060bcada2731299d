"""The tables of a design file as pydantic models, and the JSON Schema that is made of them.

Only functions that read or describe a design file import this module, since it loads pydantic.
Run as ``python -m tensionlib.package.files.schema docs/design-file.schema.json`` it writes the
schema anew.
"""

from __future__ import annotations

import json
import sys
from pathlib import Path
from typing import Annotated, Any

from pydantic import Field
from pydantic.json_schema import GenerateJsonSchema, JsonSchemaValue
from pydantic_core import core_schema

from tensionlib.package.files.end_tables import (
    AcrossTable,
    EndReference,
    EndTable,
    OverstrengthTable,
)
from tensionlib.package.files.fields import FORCE_EXAMPLE, LENGTH_EXAMPLE
from tensionlib.package.files.typed import (
    Block,
    Date,
    Line,
    Name,
    Option,
    OtherForce,
    Table,
    Tension,
    above_zero,
    one_of,
)
from tensionlib.quantities import Quantity

STATUSES = ("draft", "issued")
PAPERS = ("A4", "Letter")


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
    notes: list[Block] = Field([])
    revisions: list[RevisionTable] = Field([])


class StandardTable(Table):
    """The standard the members are designed to."""

    name: Name = Field(examples=["NZS 3404"])
    options: dict[str, Option] = Field({}, description="passed to the standard as they are")


class MemberTable(Table):
    """A member: `end` when both ends are alike, else `start_end` and `far_end`."""

    mark: Name = Field(examples=["RB1"])
    title: Block = ""
    section: Name = Field(examples=["150x90x10 UA"])
    steel: Name = Field(examples=["AS/NZS 3679.1 300"])
    length: Annotated[Quantity, above_zero(LENGTH_EXAMPLE)] = Field(examples=[LENGTH_EXAMPLE])
    force: Annotated[Quantity, Tension] = Field(examples=[FORCE_EXAMPLE])
    end: EndReference | None = None
    start_end: EndReference | None = None
    far_end: EndReference | None = None
    standard: Line = Field("", description="for this member alone, in place of the project's")
    service_force: Annotated[Quantity | None, OtherForce] = None
    ties: Annotated[Quantity | None, above_zero("1500 mm")] = None
    across: AcrossTable | None = None
    overstrength: OverstrengthTable | None = None


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
    members: list[MemberTable] = Field([])
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
