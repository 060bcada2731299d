"""From the fields that a design file states to the ends and gussets they stand for."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

from tensionlib.joints.ends import Bolted, Gusset, Welded
from tensionlib.joints.gusset_shape import GussetShape
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.holes import Hole, Pattern
from tensionlib.joints.pattern_end import BoltedPattern, Covers
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.welded_runs import FilletRun, WeldedRuns
from tensionlib.members.member import End

Stated = Mapping[str, Any]

KINDS: dict[str, type[Any]] = {
    each.kind: each for each in (Bolted, BoltedPattern, Welded, WeldedRuns, Pinned, Threaded)
}


def end_of(kind: str, stated: Stated) -> End:
    """The end of a kind, by its fields as the file states them.

    Raises
    ------
    InputError, UnitError
        For fields that do not go together; the message begins with the field.
    """
    arguments = {**stated, "plate": plate_of(**stated["plate"])}
    if "holes" in stated:
        arguments["holes"] = holes_of(stated["holes"])
    if "runs" in stated:
        arguments["runs"] = tuple(FilletRun(**run) for run in stated["runs"])
    made: End = KINDS[kind](**arguments)
    return made


def plate_of(**stated: Any) -> Gusset:
    """A gusset, or cover plates where their number is stated. Raises as `end_of`."""
    for name, what in (("hanger", Hanger), ("shape", GussetShape)):
        if name in stated:
            stated[name] = what(**stated[name])
    return Covers(**stated) if "number" in stated else Gusset(**stated)


def holes_of(tables: Iterable[Stated]) -> Pattern:
    """Holes one by one, or lines of them, in the order of the file. Raises as `end_of`."""
    found: tuple[Hole, ...] = ()
    for table in tables:
        found += Pattern.lines(**table).holes if "per_line" in table else (Hole(**table),)
    return Pattern(found)
