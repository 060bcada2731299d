"""What a design file and its schedule say, once it has been checked: plain frozen data."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, Any

from tensionlib.package.files.problems import Problem
from tensionlib.quantities import ANGLE, Quantity, parse
from tensionlib.quantities.roles import unit_text

if TYPE_CHECKING:
    from tensionlib.members.beside import Across, Overstrength
    from tensionlib.members.member import End

Stated = str | int | float | Quantity


@dataclass(frozen=True)
class Revision:
    """One row of the revision table."""

    revision: str
    date: str
    description: str
    made_by: str = ""
    checked_by: str = ""


@dataclass(frozen=True)
class Project:
    """The job as the cover and the document control table print it; every text is literal."""

    job_number: str
    title: str
    client: str = ""
    site: str = ""
    made_by: str = ""
    checked_by: str = ""
    approved_by: str = ""
    status: str = "draft"
    revision: str = ""
    date: str = ""
    paper: str = "A4"
    notes: tuple[str, ...] = ()
    revisions: tuple[Revision, ...] = ()


@dataclass(frozen=True)
class StandardChoice:
    """The standard by name, and its options as stated; the standard itself judges them."""

    name: str
    options: Mapping[str, Stated | bool]


@dataclass(frozen=True)
class EndDetail:
    """An end connection as stated, its fields checked one by one.

    Parameters
    ----------
    name : str
        The name it has under `[ends]`; empty for one written inside a member.
    kind : str
        "bolted", "bolted pattern", "welded", "welded runs", "pinned" or "rod".
    stated : tuple of (name, value)
        The fields that were stated, dimensions as Quantity, holes and runs as lists of dicts. What
        was left out is not here: the connection takes its own default for it.
    plate : tuple of (name, value)
        The fields of the gusset that were stated, its hanger and its shape as dicts.
    """

    name: str
    kind: str
    stated: tuple[tuple[str, Any], ...]
    plate: tuple[tuple[str, Any], ...]

    def arguments(self) -> dict[str, Any]:
        """Keyword arguments for the kind's class; `plate` is a dict of them for `Gusset`."""
        return {**dict(self.stated), "plate": dict(self.plate)}

    def table(self) -> dict[str, Any]:
        """The same detail as a table of a design file: lengths as text with their unit."""
        return {
            "kind": self.kind,
            **{name: written(value) for name, value in self.stated},
            "plate": {name: written(value) for name, value in self.plate},
        }

    def end(self) -> End:
        """The connection itself.

        Raises
        ------
        InputError, UnitError
            When fields that are each well stated do not go together.
        """
        from tensionlib.package.files.shaped import end_of

        return end_of(self.kind, self.arguments())


@dataclass(frozen=True)
class MemberRow:
    """One member to be designed.

    Parameters
    ----------
    mark, title, section, steel : str
    length : Quantity
        Above zero.
    force : Quantity
        Design tension force, zero or more.
    end_1, end_2 : EndDetail
    origin : str
        Where it was stated: "members.csv row 3" or "canopy.toml line 40".
    standard : str
        Name of the standard for this member alone; empty for the project's.
    service_force, ties : Quantity, optional
    across : Across, optional
    overstrength : Overstrength, optional
    """

    mark: str
    title: str
    section: str
    steel: str
    length: Quantity
    force: Quantity
    end_1: EndDetail
    end_2: EndDetail
    origin: str
    standard: str = ""
    service_force: Quantity | None = None
    ties: Quantity | None = None
    across: Across | None = None
    overstrength: Overstrength | None = None


@dataclass(frozen=True)
class ScheduleSettings:
    """How the design file says its schedule is to be read."""

    file: str
    sheet: str
    columns: Mapping[str, str]
    ignore: tuple[str, ...]
    defaults: Mapping[str, str]


@dataclass(frozen=True)
class ScheduleRows:
    """The good rows of a schedule, and what is wrong with the others."""

    rows: tuple[MemberRow, ...]
    problems: tuple[Problem, ...] = ()


@dataclass(frozen=True)
class DesignFile:
    """A design file that has been read and checked.

    Parameters
    ----------
    path : Path
    project : Project
    standard : StandardChoice
    ends : mapping of str to EndDetail
    members : tuple of MemberRow
        Those of the design file first, then the rows of the schedule.
    schedule : ScheduleSettings or None
    problems : tuple of Problem
        The schedule's problems when it was read with ``strict=False``; else empty.
    """

    path: Path
    project: Project
    standard: StandardChoice
    ends: Mapping[str, EndDetail]
    members: tuple[MemberRow, ...]
    schedule: ScheduleSettings | None
    problems: tuple[Problem, ...] = ()


def written(value: Any) -> Any:
    """A stated value as a design file writes it, so that reading it gives the same number."""
    if isinstance(value, Mapping):
        return {key: written(one) for key, one in value.items()}
    if isinstance(value, list | tuple):
        return [written(one) for one in value]
    if not isinstance(value, Quantity):
        return value
    # Twelve significant figures are what a quantity carries; a division may cost the last of them.
    for figures in (11, 12):
        text = f"{value.internal / value.unit.size:.{figures}g} {value.unit.name}"
        if parse(text).internal == value.internal:
            return text
    role = value.role
    unit = "rad" if role is ANGLE else unit_text((("N", role.force), ("mm", role.length)))
    return f"{value.internal:.12g} {unit}"
