"""From the tables of a design file to ends, gussets and what a member carries beside its tension.

The classes check their own fields; here names are compared with them and tables nested in a table
become the objects they stand for.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import fields
from typing import Any

from tensionlib.errors import InputError, did_you_mean
from tensionlib.joints.ends import Bolted, Gusset, Welded
from tensionlib.joints.gusset_shape import GussetShape
from tensionlib.joints.hanger import Hanger
from tensionlib.joints.holes import Hole, Pattern
from tensionlib.joints.pattern_end import BoltedPattern, Covers
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.welded_runs import FilletRun, WeldedRuns
from tensionlib.members.beside import Across, Overstrength
from tensionlib.members.member import End

Stated = Mapping[str, Any]

KINDS: dict[str, type[Any]] = {
    each.kind: each for each in (Bolted, BoltedPattern, Welded, WeldedRuns, Pinned, Threaded)
}
BESIDE: dict[str, type[Any]] = {"across": Across, "overstrength": Overstrength}
_LINES = ("per_line", "at", "end_distance", "pitch", "stagger", "element", "first")


def end_of(kind: str, stated: Stated) -> End:
    """The end of a kind, by its fields as the file states them.

    Raises
    ------
    InputError, UnitError
        Beginning with the field, for one that is not sound or not a field.
    """
    arguments = dict(stated)
    if "plate" in arguments:
        arguments["plate"] = _plate(arguments["plate"])
    if "holes" in arguments:
        arguments["holes"] = _pattern(arguments["holes"])
    if "runs" in arguments:
        runs = _tables("runs", arguments["runs"])
        arguments["runs"] = tuple(_made("runs", FilletRun, run) for run in runs)
    made: End = _made("", KINDS[kind], arguments)
    return made


def beside_of(name: str, stated: object) -> Any:
    """`Across` or `Overstrength` of a member's sub-table. Raises as `end_of`."""
    if not isinstance(stated, Mapping):
        raise InputError(f"{name}: got {stated!r}; a table is due")
    return _made(name, BESIDE[name], stated)


def _made(where: str, what: type[Any], stated: Stated) -> Any:
    """An object of a class from a table, unknown and missing keys told apart."""
    known = {f.name: f for f in fields(what)}
    before = f"{where}: " if where else ""
    for key in stated:
        if key not in known:
            raise InputError(
                f"{before}{key}: is no key here; keys are {', '.join(known)}."
                + did_you_mean(key, known)
            )
    missing = [
        name for name, f in known.items() if name not in stated and "MISSING" in repr(f.default)
    ]
    if missing:
        raise InputError(f"{before}{missing[0]}: missing; it is due")
    try:
        return what(**stated)
    except InputError as error:
        if not where or str(error).startswith(where):
            raise
        raise InputError(f"{before}{error}") from None


def _tables(name: str, value: object) -> list[Stated]:
    if not isinstance(value, list | tuple) or not all(isinstance(v, Mapping) for v in value):
        raise InputError(f"{name}: got {value!r}; a list of tables is due")
    return list(value)


def _plate(stated: Stated) -> Gusset:
    """A gusset, or cover plates where the table states their number."""
    arguments = dict(stated)
    for name, what in (("hanger", Hanger), ("shape", GussetShape)):
        if name in arguments:
            table = arguments[name]
            if not isinstance(table, Mapping):
                raise InputError(f"plate: {name}: got {table!r}; a table is due")
            arguments[name] = _made(f"plate: {name}", what, table)
    made: Gusset = _made("plate", Covers if "number" in arguments else Gusset, arguments)
    return made


def _pattern(stated: object) -> Pattern:
    """Holes one by one, or lines of them, in the order of the file."""
    found: Pattern | None = None
    for table in _tables("holes", stated):
        if "per_line" in table:
            for key in table:
                if key not in _LINES:
                    raise InputError(
                        f"holes: {key}: is no key of lines; keys are {', '.join(_LINES)}."
                        + did_you_mean(key, _LINES)
                    )
            for key in ("at", "end_distance"):
                if key not in table:
                    raise InputError(f"holes: {key}: missing; lines of holes need it")
            one = Pattern.lines(**dict(table))
        else:
            one = Pattern((_made("holes", Hole, table),))
        found = one if found is None else found + one
    if found is None:
        raise InputError("holes: none; give at least one hole")
    return found
