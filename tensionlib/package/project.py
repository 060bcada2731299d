"""A design file checked: every member of it designed, one summary, one verdict."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from html import escape
from os import PathLike
from pathlib import Path
from typing import Any

from tensionlib.calculation.readings import html
from tensionlib.calculation.readings.bundle import MIMETYPE
from tensionlib.calculation.result import Calculation
from tensionlib.errors import DataNotFoundError, InputError, TensionlibError, did_you_mean
from tensionlib.members.design import design
from tensionlib.members.member import Member
from tensionlib.package.files import (
    DesignFile,
    MemberRow,
    Problem,
    project_record,
    read_design_file,
)
from tensionlib.quantities import METRIC, View, format_utilisation

SUMMARY_HEAD = (
    "Mark",
    "Section",
    "N*",
    "Governing check",
    "Clause",
    "Utilisation",
    "Verdict",
)


class MemberError(InputError):
    """Members that could not be designed: all of them, with where each was stated."""

    def __init__(self, problems: tuple[tuple[str, str], ...]) -> None:
        self.problems = problems
        lines = [f"  {origin}: {reason}" for origin, reason in problems]
        super().__init__("members that cannot be designed:\n" + "\n".join(lines))


@dataclass(frozen=True)
class Cover:
    """The job's particulars. Shown in a notebook, they make the cover of its package."""

    record: dict[str, Any]

    def _repr_mimebundle_(self, include: Any = None, exclude: Any = None) -> dict[str, Any]:
        rows = [
            (label, self.record[key])
            for label, key in (
                ("Job", "job_number"),
                ("Title", "title"),
                ("Client", "client"),
                ("Site", "site"),
                ("Revision", "revision"),
                ("Date", "date"),
                ("Status", "status"),
                ("Standard", "standard"),
                ("Made by", "made_by"),
                ("Checked by", "checked_by"),
            )
            if self.record[key]
        ]
        body = "".join(f"<tr><th>{k}</th><td>{escape(str(v))}</td></tr>" for k, v in rows)
        return {
            "text/plain": "\n".join(f"{label:<12}{value}" for label, value in rows),
            "text/html": f'<style>{html.style()}</style><div class="tl-calc mathjax_ignore'
            f' tex2jax_ignore"><table>{body}</table></div>',
            MIMETYPE: self.record,
        }


@dataclass(frozen=True)
class CheckedFile:
    """Every member of a design file, designed.

    Iterates over the calculations; ``checked["RB1"]`` is one of them, ``checked.cover`` the job's
    particulars. Shown in a notebook it is the summary, and its package prints every calculation.
    """

    design_file: DesignFile
    calculations: tuple[Calculation, ...]
    problems: tuple[Problem, ...] = ()
    failures: tuple[tuple[str, str], ...] = ()

    @property
    def cover(self) -> Cover:
        return Cover(project_record(self.design_file))

    @property
    def passes(self) -> bool:
        """Whether every member was designed and passes."""
        return not self.problems and not self.failures and all(c.passes for c in self)

    def __iter__(self) -> Iterator[Calculation]:
        return iter(self.calculations)

    def __len__(self) -> int:
        return len(self.calculations)

    def __getitem__(self, mark: str) -> Calculation:
        for calc in self.calculations:
            if calc.heading.mark == mark:
                return calc
        marks = [calc.heading.mark for calc in self.calculations]
        raise DataNotFoundError(
            f"mark: {mark!r} is not in {self.design_file.path.name}." + did_you_mean(mark, marks)
        )

    def record(self) -> dict[str, Any]:
        """The schedule as plain data."""
        schedule = self.design_file.schedule
        return {
            "format": "tensionlib",
            "version": 1,
            "kind": "schedule",
            "title": self.design_file.project.title,
            "source": {
                "design_file": self.design_file.path.name,
                "schedule": schedule.file if schedule else "",
            },
            "members": [calc.record() for calc in self.calculations],
        }

    def summary(self) -> list[tuple[str, ...]]:
        """One row a member, in the order of `SUMMARY_HEAD`."""
        return [_summary(calc.record()) for calc in self.calculations]

    def text(self) -> str:
        """The summary for a terminal."""
        rows = [SUMMARY_HEAD, *self.summary()]
        widths = [max(len(row[i]) for row in rows) for i in range(len(SUMMARY_HEAD))]
        rule = "  ".join("─" * width for width in widths)
        lines = [
            "  ".join(
                f"{cell:>{width}}" if i in (2, 5) else f"{cell:<{width}}"
                for i, (cell, width) in enumerate(zip(row, widths, strict=True))
            ).rstrip()
            for row in rows
        ]
        return "\n".join([*self._heading(), "", lines[0], rule, *lines[1:], "", *self._closing()])

    def _heading(self) -> list[str]:
        """What was checked, to which standard, in which revision."""
        read = self.design_file
        job = " ".join(filter(None, (read.project.job_number, read.project.title)))
        revision = f", revision {read.project.revision}" if read.project.revision else ""
        return [job, f"{read.path.name}{revision}, {read.project.status}, to {read.standard.name}"]

    def _closing(self) -> list[str]:
        """How many pass, the highest utilisation, and the advice that is exceeded."""
        failing = sum(not calc.passes for calc in self)
        end = f"{len(self)} members: " + (
            "all pass" if not failing else f"{failing} not passing, {len(self) - failing} pass"
        )
        highest = max(self, key=lambda calc: calc.utilisation, default=None)
        if highest is not None:
            used = format_utilisation(highest.utilisation)
            end += f"; highest utilisation {used} ({highest.heading.mark})"
        advice: dict[str, list[str]] = {}
        for calc in self:
            for check in calc:
                if check.verdict == "advice":
                    advice.setdefault(check.name, []).append(calc.heading.mark)
        return [
            end,
            *(f"advice exceeded, {name}: {' '.join(marks)}" for name, marks in advice.items()),
        ]

    def _repr_mimebundle_(self, include: Any = None, exclude: Any = None) -> dict[str, Any]:
        head = "".join(f"<th>{escape(cell)}</th>" for cell in SUMMARY_HEAD)
        body = "".join(
            "<tr>" + "".join(f"<td>{_whole(cell, i)}</td>" for i, cell in enumerate(row)) + "</tr>"
            for row in self.summary()
        )
        return {
            "text/plain": self.text(),
            "text/html": f'<style>{html.style()}</style><div class="tl-calc mathjax_ignore'
            f' tex2jax_ignore"><table class="tl-summary"><thead><tr>{head}</tr></thead><tbody>'
            f"{body}</tbody></table></div>",
            MIMETYPE: self.record(),
        }


def _whole(cell: str, column: int) -> str:
    """A cell of the summary; a force is not torn from its unit."""
    shown = escape(cell)
    return shown.replace(" ", "&nbsp;") if SUMMARY_HEAD[column] in ("N*", "Section") else shown


def check_file(
    path: str | PathLike[str], *, strict: bool = True, view: View = METRIC
) -> CheckedFile:
    """Read a design file with its schedule and design every member.

    Parameters
    ----------
    path : path
        A design file (TOML).
    strict : bool
        When False, members and rows that cannot be designed are left out and reported in
        `problems` and `failures`; otherwise they are an error that lists them all.

    Raises
    ------
    DesignFileError
        For a file or a schedule that is not valid, all its problems listed.
    MemberError
        For members that cannot be designed.
    """
    read = read_design_file(Path(path), strict=strict)
    calculations: list[Calculation] = []
    failures: list[tuple[str, str]] = []
    for row in read.members:
        try:
            calculations.append(_designed(row, row.standard or read.standard.name, view))
        except TensionlibError as error:
            failures.append((f"{row.origin}, {row.mark}", str(error)))
    if failures and strict:
        raise MemberError(tuple(failures))
    return CheckedFile(read, tuple(calculations), read.problems, tuple(failures))


def _designed(row: MemberRow, standard: str, view: View) -> Calculation:
    end_1 = row.end_1.end()
    end_2 = None if row.end_2 == row.end_1 else row.end_2.end()
    member = Member(
        row.mark,
        row.section,
        row.steel,
        row.length,
        end_1,
        end_2,
        row.title,
        across=row.across,
        overstrength=row.overstrength,
        ties=row.ties,
    )
    return design(
        member,
        row.force,
        standard=standard,
        service=row.service_force,
        view=view,
        origin=row.origin,
    )


def _summary(record: dict[str, Any]) -> tuple[str, ...]:
    governing = record["verdict"]["governing"]
    force = record["force"]
    if governing is None:
        check, clause, used = "", "", ""
    else:
        check, clause, used = governing["label"], governing["clause"], governing["text"]
    section = record["subject"].partition(", ")[0]
    return (record["mark"], section, force, check, clause, used, record["verdict"]["word"])
