"""What is wrong with a file: every problem with its place, and the errors that list them all."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from typing import Any, Literal

from tensionlib.errors import InputError

_LONGEST = 60
_LONGEST_REASON = 1000


@dataclass(frozen=True)
class Problem:
    """One problem of a design file or of a schedule.

    Parameters
    ----------
    file : str
        Name of the file, without its folder.
    line : int or None
        Line of a design file, or row of a schedule as a spreadsheet counts it; both from 1. None
        when the problem is the whole file's.
    field : str
        Key path of a design file ("ends.A.pitch", list entries counted from 1), or the header of a
        schedule's column. Empty when the problem belongs to no one field.
    value : str
        What was found there, shortened to 60 characters; empty when nothing was.
    reason : str
        What is wrong, and what would be accepted.
    counted : {"line", "row"}
        What `line` counts.
    """

    file: str
    line: int | None
    field: str
    value: str
    reason: str
    counted: Literal["line", "row"] = "line"

    @property
    def row(self) -> int | None:
        """The same as `line`, by the name a schedule has for it."""
        return self.line

    @property
    def column(self) -> str:
        """The same as `field`, by the name a schedule has for it."""
        return self.field

    def __str__(self) -> str:
        place = self.file
        if self.line is not None:
            place += f", {self.counted} {self.line}"
        if self.field:
            place += f", {self.field}"
        return f"{place}: {self.reason}"


class _Listed(InputError):
    """An input error that carries every problem of a file and lists them."""

    def __init__(self, problems: Iterable[Problem], opening: str = "") -> None:
        self.problems: list[Problem] = list(problems)
        self.opening = opening
        lines = [str(problem) for problem in self.problems]
        if opening:
            lines = [opening, *(f"  {line}" for line in lines)]
        elif len(lines) > 1:
            lines = [f"{len(lines)} problems:", *(f"  {line}" for line in lines)]
        super().__init__("\n".join(lines))

    def __reduce__(self) -> tuple[Any, ...]:
        return (type(self), (self.problems, self.opening))


class DesignFileError(_Listed):
    """A design file that cannot be taken; `problems` holds every one of them in file order."""


class ScheduleError(_Listed):
    """A schedule with problems; `problems` holds every one of them in row order."""


def in_order(problems: Sequence[Problem]) -> list[Problem]:
    """Sort by file and line, keeping the order in which problems of one line were found."""
    files = list(dict.fromkeys(problem.file for problem in problems))
    return sorted(problems, key=lambda p: (files.index(p.file), p.line or 0))


def shown(value: object) -> str:
    """Write a value as it would stand in a file, shortened when it is long."""
    if isinstance(value, bool):
        text = "true" if value else "false"
    elif isinstance(value, dict):
        text = "a table"
    elif isinstance(value, list):
        text = "a list"
    elif isinstance(value, str):
        text = repr(value)
    else:
        text = str(value)
    return text if len(text) <= _LONGEST else text[: _LONGEST - 1] + "…"


def reason_of(error: Exception, *fields: str) -> str:
    """The message of an error, without the field's name in front where the place says it."""
    message = str(error)
    for field in fields:
        message = message.removeprefix(f"{field}: ")
    return message if len(message) <= _LONGEST_REASON else message[: _LONGEST_REASON - 1] + "…"
