"""Reading a design file: TOML in, plain checked data out, with every problem by its line."""

from __future__ import annotations

import json
import os
import re
import tomllib
from collections.abc import Mapping
from dataclasses import fields as dataclass_fields
from dataclasses import replace
from pathlib import Path, PurePosixPath, PureWindowsPath
from types import MappingProxyType
from typing import TYPE_CHECKING, Any

from tensionlib.errors import TensionlibError, did_you_mean
from tensionlib.members.beside import Across, Overstrength
from tensionlib.package.files.fields import KnownNames, named
from tensionlib.package.files.locate import Lines, dotted
from tensionlib.package.files.locate import Path as KeyPath
from tensionlib.package.files.problems import (
    DesignFileError,
    Problem,
    in_order,
    reason_of,
    shown,
)
from tensionlib.package.files.reading import UnreadableError, decode, read_bytes
from tensionlib.package.files.records import (
    DesignFile,
    EndDetail,
    MemberRow,
    Project,
    Revision,
    ScheduleRows,
    ScheduleSettings,
    StandardChoice,
    written,
)
from tensionlib.package.files.schedule import ENDS, Setup, no_end, rows_of
from tensionlib.package.files.shaped import KINDS
from tensionlib.quantities import Quantity

if TYPE_CHECKING:
    from tensionlib.package.files import schema
    from tensionlib.package.files.end_tables import EndTables
    from tensionlib.package.files.typed import Table

_TOML_PLACE = re.compile(r"\s*\(at (?:line (\d+), column (\d+)|end of document)\)$")


def read_design_file(
    path: str | os.PathLike[str], *, strict: bool = True, known: KnownNames | None = None
) -> DesignFile:
    """Read a design file, and the schedule it names.

    Parameters
    ----------
    path : path
        A TOML file; docs/design-file.md gives its layout.
    strict : bool
        Whether a schedule with bad rows is an error. Otherwise the good rows are members and
        `problems` holds what is wrong. Problems of the design file itself are always errors.
    known : KnownNames, optional
        What decides whether a section, steel, bolt, weld metal or standard is known; the
        library's catalogues unless given.

    Raises
    ------
    DesignFileError
        With every problem of the file and of its schedule.
    """
    path = Path(path)
    try:
        text = decode(read_bytes(path))
    except UnreadableError as error:
        raise DesignFileError([Problem(path.name, error.line, "", "", error.reason)]) from None
    checked = CheckedText(path, text, known or KnownNames.of_library())
    if checked.design is None or (strict and checked.schedule_problems):
        raise DesignFileError([*checked.problems, *checked.schedule_problems])
    return replace(checked.design, problems=checked.schedule_problems)


def project_record(design: DesignFile) -> dict[str, Any]:
    """The record of kind "project" that the cover and the document control table are made of.

    Its values are text, literal as the design file has them, and lists of them.
    """
    project = design.project
    return {
        "format": "tensionlib",
        "version": 1,
        "kind": "project",
        "job_number": project.job_number,
        "title": project.title,
        "client": project.client,
        "site": project.site,
        "made_by": project.made_by,
        "checked_by": project.checked_by,
        "approved_by": project.approved_by,
        "status": project.status,
        "revision": project.revision,
        "date": project.date,
        "revisions": [
            {
                "revision": one.revision,
                "date": one.date,
                "description": one.description,
                "made_by": one.made_by,
                "checked_by": one.checked_by,
            }
            for one in project.revisions
        ],
        "standard": design.standard.name,
        "paper": project.paper,
        "design_file": design.path.name,
        "notes": list(project.notes),
    }


class CheckedText:
    """The text of a design file taken apart: the design if it is sound, and every problem.

    `design` is None when the design file itself has a problem; `problems` are those of the file,
    `schedule_problems` those of the schedule it names, each in the order of the file.
    """

    def __init__(self, path: Path, text: str, known: KnownNames) -> None:
        self._path = path
        self._known = known
        self._found: list[Problem] = []
        self._raw: dict[str, Any] = {}
        self._marks: dict[str, int] = {}
        self.design: DesignFile | None = None
        self.schedule_problems: tuple[Problem, ...] = ()
        try:
            self._raw = tomllib.loads(text)
        except (ValueError, RecursionError) as error:
            self._found.append(_broken(path.name, text, error))
        else:
            self._lines = Lines(text)
            self._check()
        self.problems = tuple(in_order(self._found))

    def _tell(self, path: KeyPath, value: object, reason: str, absent: bool = False) -> None:
        self._found.append(
            Problem(
                self._path.name,
                self._lines.line(path),
                dotted(path),
                "" if absent else shown(value),
                reason,
            )
        )

    def _check(self) -> None:
        from tensionlib.package.files import schema

        for key in self._raw:
            if key not in schema.DesignFileTables.model_fields:
                self._unknown((key,), schema.DesignFileTables)
        project = self._piece(schema.ProjectTable, ("project",))
        standard = self._piece(schema.StandardTable, ("standard",))
        schedule = self._piece(schema.ScheduleTable, ("schedule",), needed=False)
        if isinstance(project, schema.ProjectTable):
            self._check_issued(project)
        if isinstance(standard, schema.StandardTable):
            self._check_name(("standard", "name"), standard.name, "standard")
            self._check_options(standard)
        ends = self._ends()
        members = self._members(ends)
        settings, rows = None, ScheduleRows(())
        if isinstance(schedule, schema.ScheduleTable):
            settings, rows = self._schedule(schedule, ends)
        self.schedule_problems = rows.problems
        if self._found or project is None or standard is None:
            return
        self.design = DesignFile(
            path=self._path,
            project=_project(project),
            standard=StandardChoice(standard.name, MappingProxyType(dict(standard.options))),
            ends=MappingProxyType({name: end for name, end in ends.items() if end is not None}),
            members=(*members, *rows.rows),
            schedule=settings,
        )

    # One table at a time, so that a fault in one hides none in another

    def _piece(self, model: type[Table], path: KeyPath, *, needed: bool = True) -> Any:
        """A table checked against its model, or None after telling what is wrong with it."""
        if path[0] not in self._raw:
            if needed:
                self._tell(path, "", f"missing; write a table [{path[0]}]{_needs(model)}", True)
            return None
        return self._validated(model, self._raw[str(path[0])], path)

    def _validated(self, kind: Any, raw: object, path: KeyPath) -> Any:
        from pydantic import TypeAdapter, ValidationError

        try:
            return TypeAdapter(kind).validate_python(raw)
        except ValidationError as error:
            for one in error.errors(include_url=False):
                self._tell_pydantic(dict(one), path)
        return None

    def _tell_pydantic(self, error: dict[str, Any], base: KeyPath) -> None:
        """Turn one of pydantic's errors into a problem in our words."""
        from tensionlib.package.files.end_tables import TAGS, example_of
        from tensionlib.package.files.typed import TogetherError

        path = (*base, *(step for step in error["loc"] if step not in TAGS))
        value = error["input"]
        kind = error["type"]
        if kind == "extra_forbidden":
            self._unknown(path, self._model_at(path[:-1]))
        elif kind == "missing":
            example = example_of(self._model_at(path[:-1]), str(path[-1]))
            written_so = "" if example is None else f"; write {path[-1]} = {_toml(example)}"
            self._tell(path, "", f"missing{written_so}", True)
        elif kind == "union_tag_not_found":
            self._tell_kind(path, value)
        elif kind == "value_error" and isinstance(error["ctx"]["error"], TogetherError):
            self._tell_together(path, self._model_at(path), error["ctx"]["error"])
        elif kind == "value_error":
            self._tell(path, value, str(error["ctx"]["error"]))
        else:
            due = {
                "string_type": "text in quotation marks",
                "bool_type": "true or false",
                "list_type": "a list",
                "dict_type": "a table",
                "model_type": "a table",
                "model_attributes_type": "a table",
            }
            got = f"got {shown(value)}; "
            self._tell(path, value, f"{got}{due[kind]} is due" if kind in due else error["msg"])

    def _tell_together(self, path: KeyPath, model: type[Table], error: TensionlibError) -> None:
        """Tell of fields that do not go together, by the message of the object they were to make.

        It begins with the field, as the door's do; "plate.width" is a field of a table in it.
        """
        field = str(error).partition(": ")[0]
        steps = tuple(field.split("."))
        known = steps[0] in model.model_fields
        place = (*path, *steps) if known else path
        there = known and self._lines.has(place)
        value = self._raw_at(place) if there else ""
        self._tell(place, value, reason_of(error, field) if known else str(error), not there)

    def _raw_at(self, path: KeyPath) -> Any:
        found: Any = self._raw
        for step in path:
            found = found[step]
        return found

    def _tell_kind(self, path: KeyPath, value: object) -> None:
        *others, last = (f'"{kind}"' for kind in sorted(KINDS))
        due = f"write kind = {', '.join(others)} or {last}"
        if not isinstance(value, dict):
            self._tell(path, value, f"got {shown(value)}; the name of an end or a table is due")
        elif "kind" not in value:
            self._tell((*path, "kind"), "", f"missing; {due}", True)
        else:
            kind = value["kind"]
            near = did_you_mean(kind, sorted(KINDS)) if isinstance(kind, str) else ""
            self._tell((*path, "kind"), kind, f"got {shown(kind)}; {due}.{near}".removesuffix("."))

    def _unknown(self, path: KeyPath, model: type[Table]) -> None:
        keys = list(model.model_fields)
        near = did_you_mean(str(path[-1]), keys) or f" Keys here are {', '.join(keys)}."
        self._tell(path, "", f"unknown key.{near}", True)

    def _model_at(self, path: KeyPath) -> type[Table]:
        """The model of the table that stands at a path."""
        from tensionlib.package.files import end_tables, schema

        match path:
            case ("project",):
                return schema.ProjectTable
            case ("project", "revisions", _):
                return schema.RevisionTable
            case ("standard",):
                return schema.StandardTable
            case ("schedule",):
                return schema.ScheduleTable
            case ("schedule", "columns"):
                return schema.ColumnsTable
            case ("schedule", "defaults"):
                return schema.DefaultsTable
            case ("members", _):
                return schema.MemberTable
            case ("members", _, "across"):
                return end_tables.AcrossTable
            case ("members", _, "overstrength"):
                return end_tables.OverstrengthTable
            case ("ends", _) | ("members", _, _):
                return end_tables.BY_KIND[self._raw_at(path)["kind"]]
            case (*_, "plate"):
                return end_tables.GussetTable
            case (*_, "plate", "hanger"):
                return end_tables.HangerTable
            case (*_, "plate", "shape"):
                return end_tables.ShapeTable
            case (*_, "runs", _):
                return end_tables.RunTable
        lines = end_tables.are_lines(self._raw_at(path))
        return end_tables.LinesTable if lines else end_tables.HoleTable

    def _check_name(self, path: KeyPath, name: str, field: str) -> bool:
        """Whether a section, steel, bolt, weld metal or standard is known."""
        try:
            self._known.check(field, name)
        except TensionlibError as error:
            # The catalogue knows a steel by that word alone, whatever it is for.
            self._tell(path, name, reason_of(error, field.removeprefix("sleeve_")))
            return False
        return True

    def _check_names(
        self, table: Mapping[str, Any], path: KeyPath, ends: Mapping[str, Any] | None = None
    ) -> None:
        """Check all that a table names, be the table sound otherwise or not."""
        for key, value in table.items():
            here = (*path, key)
            if isinstance(value, dict):
                self._check_names(value, here)
            elif not isinstance(value, str) or not value.strip():
                continue
            elif ends is not None and key in ("end", "start_end", "far_end"):
                if value not in ends:
                    self._tell(here, value, no_end(value, ends))
            else:
                self._check_name(here, value, key)

    def _check_issued(self, project: schema.ProjectTable) -> None:
        if project.status != "issued":
            return
        for key, example in (("revision", "A"), ("date", "2025-03-14"), ("made_by", "initials")):
            if not getattr(project, key).strip():
                self._tell(
                    ("project", key),
                    getattr(project, key),
                    f"blank, and an issued file states it; write {key} = {_toml(example)}, or"
                    ' status = "draft"',
                    absent=not self._lines.has(("project", key)),
                )
        rows = [row.revision for row in project.revisions]
        if project.revision.strip() and rows and project.revision not in rows:
            self._tell(
                ("project", "revision"),
                project.revision,
                f"got {shown(project.revision)}, which has no row in the revision table"
                f" ({', '.join(rows)}); add a [[project.revisions]] for it",
            )

    def _check_options(self, standard: schema.StandardTable) -> None:
        """An option that nothing reads would be believed to act: it is refused."""
        known = self._known.options
        for option in standard.options:
            if option not in known:
                there = f" Options are {', '.join(known)}." if known else " There are none."
                near = did_you_mean(option, known) or there
                self._tell(("standard", "options", option), "", f"unknown option.{near}", True)

    # Ends

    def _ends(self) -> dict[str, EndDetail | None]:
        """The ends by name; one that is not sound is None, so that its users are not blamed."""
        from tensionlib.package.files.end_tables import EndTable

        raw = self._raw.get("ends", {})
        if not isinstance(raw, dict):
            self._tell(("ends",), raw, f"got {shown(raw)}; write each end as a table [ends.NAME]")
            return {}
        ends: dict[str, EndDetail | None] = {}
        for name, table in raw.items():
            path = ("ends", name)
            try:
                named(name)
            except TensionlibError as error:
                self._tell(path, name, f"the name of an end: {error}")
            if isinstance(table, dict):
                self._check_names(table, path)
                ends[name] = self._end(self._validated(EndTable, table, path), name, path)
            else:
                self._tell(path, table, f"got {shown(table)}; a table [ends.{name}] is due")
                ends[name] = None
        return ends

    def _end(self, made: EndTables | None, name: str, path: KeyPath) -> EndDetail | None:
        """An end whose fields are each sound, checked as a whole."""
        if made is None:
            return None
        detail = EndDetail(
            name,
            made.kind,
            tuple(made.stated(but=("kind", "plate")).items()),
            tuple(made.plate.stated().items()),
        )
        try:
            detail.end()
        except TensionlibError as error:
            self._tell_together(path, type(made), error)
            return None
        return detail

    # Members

    def _members(self, ends: Mapping[str, EndDetail | None]) -> list[MemberRow]:
        """The members that are sound; the marks of all are kept with their lines."""
        from tensionlib.package.files import schema

        raw = self._raw.get("members", [])
        if not isinstance(raw, list):
            self._tell(("members",), raw, f"got {shown(raw)}; write each member under [[members]]")
            return []
        members = []
        for place, table in enumerate(raw):
            path = ("members", place)
            made = self._validated(schema.MemberTable, table, path)
            if not isinstance(table, dict):
                continue
            self._check_names(table, path, ends)
            row = self._member(made, path, ends) if made is not None else None
            mark = str(table.get("mark", "")).strip()
            if mark in self._marks:
                self._tell(
                    (*path, "mark"),
                    mark,
                    f"{mark!r} is the mark of the member at line {self._marks[mark]} too",
                )
            elif mark:
                self._marks[mark] = self._lines.line(path)
            if row is not None:
                members.append(row)
        return members

    def _member(
        self, made: schema.MemberTable, path: KeyPath, ends: Mapping[str, EndDetail | None]
    ) -> MemberRow | None:
        given = [key for key in ("end", "start_end", "far_end") if getattr(made, key) is not None]
        if given not in (["end"], ["start_end", "far_end"]):
            self._tell(
                (*path, given[0] if given else "end"),
                "",
                (f"got {' and '.join(given)}; " if given else "missing; ")
                + "write end for both ends alike, or start_end and far_end",
                absent=True,
            )
            return None
        found = [self._end_of(getattr(made, key), (*path, key), ends) for key in given]
        end_1, end_2 = found[0], found[-1]
        if end_1 is None or end_2 is None:
            return None
        return MemberRow(
            mark=made.mark,
            title=made.title,
            section=made.section,
            steel=made.steel,
            length=made.length,
            force=made.force,
            end_1=end_1,
            end_2=end_2,
            origin=f"{self._path.name} line {self._lines.line(path)}",
            standard=made.standard,
            service_force=made.service_force,
            ties=made.ties,
            across=Across(**made.across.stated()) if made.across else None,
            overstrength=(
                Overstrength(**made.overstrength.stated()) if made.overstrength else None
            ),
        )

    def _end_of(
        self, given: Any, path: KeyPath, ends: Mapping[str, EndDetail | None]
    ) -> EndDetail | None:
        return ends.get(given) if isinstance(given, str) else self._end(given, "", path)

    # Schedule

    def _schedule(
        self,
        made: schema.ScheduleTable,
        ends: Mapping[str, EndDetail | None],
    ) -> tuple[ScheduleSettings | None, ScheduleRows]:
        defaults: dict[str, str | Quantity | None] = {}
        for column, value in made.defaults.stated().items():
            path = ("schedule", "defaults", column)
            defaults[column] = value if isinstance(value, str | Quantity) else None
            if column in ENDS and value not in ends:
                self._tell(path, value, no_end(str(value), ends))
                defaults[column] = None
            elif isinstance(value, str) and not self._check_name(path, value, column):
                defaults[column] = None
        columns = {column: str(header) for column, header in made.columns.stated().items()}
        settings = ScheduleSettings(
            file=made.file,
            sheet=made.sheet,
            columns=MappingProxyType(columns),
            ignore=tuple(made.ignore),
            defaults=MappingProxyType(
                {key: str(written(value)) for key, value in made.defaults.stated().items()}
            ),
        )
        if not _stays_inside(made.file):
            self._tell(
                ("schedule", "file"),
                made.file,
                f"got {shown(made.file)}; a file in the folder of {self._path.name} or below it is"
                ' due, written with "/", for example "members.csv"',
            )
            return settings, ScheduleRows(())
        setup = Setup(
            ends,
            defaults,
            columns,
            settings.ignore,
            made.sheet,
            self._known,
            {mark: f"{self._path.name} line {line}" for mark, line in self._marks.items()},
        )
        return settings, rows_of(self._path.parent / made.file, made.file, setup)


def _project(made: schema.ProjectTable) -> Project:
    plain = {
        one.name: getattr(made, one.name)
        for one in dataclass_fields(Project)
        if one.name not in ("notes", "revisions")
    }
    revisions = tuple(Revision(**row.model_dump()) for row in made.revisions)
    return Project(**plain, notes=tuple(made.notes), revisions=revisions)


def _stays_inside(file: str) -> bool:
    """Whether a schedule's name leads nowhere but into the design file's folder.

    A symbolic link in the folder is the owner's own arrangement and is followed.
    """
    if "\\" in file or PureWindowsPath(file).drive or PurePosixPath(file).is_absolute():
        return False
    return not os.path.normpath(file).startswith("..")


def _needs(model: type[Table]) -> str:
    needed = [key for key, field in model.model_fields.items() if field.is_required()]
    return f" with {' and '.join(needed)}" if needed else ""


def _toml(value: object) -> str:
    """An example value as TOML writes it."""
    if isinstance(value, dict):
        return "{ " + ", ".join(f"{key} = {_toml(one)}" for key, one in value.items()) + " }"
    if isinstance(value, list):
        return "[" + ", ".join(map(_toml, value)) + "]"
    return json.dumps(value, ensure_ascii=False)


def _broken(name: str, text: str, error: Exception) -> Problem:
    """The problem of a text that is no TOML."""
    if isinstance(error, RecursionError):
        return Problem(name, None, "", "", "is nested too deeply to be read")
    found = _TOML_PLACE.search(str(error))
    message = _TOML_PLACE.sub("", str(error))
    if found is None:
        return Problem(name, None, "", "", f"is not valid TOML: {message}")
    lines = text.split("\n")
    if found[1] is None:
        reason = f"is not valid TOML at its end: {message}"
        return Problem(name, len(text.rstrip("\n").split("\n")), "", "", reason)
    line, column = int(found[1]), int(found[2])
    whole = lines[line - 1].rstrip("\r")
    rest = whole[column - 1 :]
    place = shown(rest) if rest.strip() else f"the end of {shown(whole.strip())}"
    return Problem(
        name,
        line,
        "",
        rest[:60],
        f"is not valid TOML at column {column}: {message}; found {place}",
    )
