"""Changing a design file without touching what was not changed."""

from __future__ import annotations

import codecs
import datetime
import os
import tomllib
from collections.abc import Mapping, MutableMapping, MutableSequence
from copy import deepcopy
from pathlib import Path
from typing import Any

from tensionlib.errors import InputError
from tensionlib.package.files.atomic import write_atomic
from tensionlib.package.files.design_file import CheckedText
from tensionlib.package.files.fields import KnownNames
from tensionlib.package.files.problems import DesignFileError, Problem
from tensionlib.package.files.reading import UnreadableError, decode, read_bytes
from tensionlib.package.files.records import EndDetail, written
from tensionlib.quantities import Quantity


def update_design_file(
    path: str | os.PathLike[str], changes: Mapping[str, Any], *, known: KnownNames | None = None
) -> bool:
    """Change some values of a design file; comments, order and every other byte stay.

    Parameters
    ----------
    path : path
        A design file that exists.
    changes : mapping
        Nested as the file is: ``{"project": {"status": "issued"}, "ends": {"A": {"pitch":
        "80 mm"}}}``. A table is changed key by key; None takes a key out; a list takes the place
        of the list that was. An `EndDetail` takes the place of a whole end. Quantities are
        written with their unit. Members are named by mark: ``{"members": {"RB1": {"end": "B"}}}``;
        a mark that is not there yet adds a member.
    known : KnownNames, optional
        As for `read_design_file`.

    Returns
    -------
    bool
        Whether the file was written; False when it said all of this already.

    Raises
    ------
    DesignFileError
        When the file could not be read, or would not be valid after the change, or its schedule
        would have problems it has not now. The file is then as it was.
    InputError
        For changes that no design file can hold.
    FileWriteError
        When the file or its folder cannot be written. The file is then as it was.
    """
    path = Path(path)
    known = known or KnownNames.of_library()
    plain = _plain(changes, "changes")
    try:
        data = read_bytes(path)
        text = decode(data)
    except UnreadableError as error:
        raise DesignFileError([Problem(path.name, error.line, "", "", error.reason)]) from None
    changed = _changed(path, text, plain, known)
    if changed == text:
        return False
    checked = CheckedText(path, changed, known)
    problems = [*checked.problems, *_new_in_schedule(path, text, checked, known)]
    if problems:
        raise DesignFileError(
            problems, f"{path.name} was not changed; after the change it would not be valid:"
        )
    mark = codecs.BOM_UTF8 if data.startswith(codecs.BOM_UTF8) else b""
    write_atomic(path, mark + changed.encode("utf-8"))
    return True


def _changed(path: Path, text: str, changes: Mapping[str, Any], known: KnownNames) -> str:
    """The text after the changes, which reads as the data after the changes."""
    import tomlkit
    from tomlkit.exceptions import TOMLKitError

    try:
        wanted = tomllib.loads(text)
        document = tomlkit.parse(text)
    except (ValueError, RecursionError):
        raise DesignFileError(
            CheckedText(path, text, known).problems,
            f"{path.name} was not changed; it is not valid TOML as it stands:",
        ) from None
    try:
        _apply(wanted, changes)
        _apply(document, changes)
        changed = tomlkit.dumps(document)
        if "\r\n" in text and "\n" not in text.replace("\r\n", ""):
            changed = changed.replace("\r\n", "\n").replace("\n", "\r\n")
        faithful = tomllib.loads(changed) == wanted
    except (TOMLKitError, ValueError, TypeError, KeyError, AttributeError) as error:
        raise InputError(f"changes: cannot be brought into {path.name} ({error})") from None
    if not faithful:
        raise InputError(
            f"changes: cannot be brought into {path.name} as it is laid out; write the table that"
            " changes under a header of its own"
        )
    return changed


def _new_in_schedule(
    path: Path, text: str, checked: CheckedText, known: KnownNames
) -> list[Problem]:
    """The problems a change brings to the schedule; those it had do not stand in the way."""
    if not checked.schedule_problems:
        return []
    had = CheckedText(path, text, known).schedule_problems
    return [problem for problem in checked.schedule_problems if problem not in had]


class _Whole(dict[str, Any]):
    """A table that takes the place of another one, where a plain dict changes some of its keys."""


def _whole(value: Any) -> Any:
    if isinstance(value, dict):
        return _Whole({key: _whole(one) for key, one in value.items()})
    return value


def _plain(value: Any, place: str) -> Any:
    """Changes as TOML can hold them: dicts, lists and plain values, quantities as text."""
    if isinstance(value, Quantity):
        return written(value)
    if isinstance(value, EndDetail):
        return _whole(value.table())
    if isinstance(value, Mapping):
        for key in value:
            if not isinstance(key, str):
                raise InputError(f"{place}: the key {key!r} is not text")
        return {key: _plain(one, f"{place}[{key!r}]") for key, one in value.items()}
    if isinstance(value, list | tuple):
        return [_whole(_plain(one, place)) for one in value]
    if value is None or isinstance(value, str | int | float | datetime.date):
        return value
    raise InputError(
        f"{place}: got {value!r}; text, a number, a quantity, a list or a mapping is due"
    )


def _apply(document: MutableMapping[str, Any], changes: Mapping[str, Any]) -> None:
    """Bring changes into a document of tomlkit, or the same data as plain dicts."""
    by_mark = changes.get("members")
    if isinstance(by_mark, Mapping):
        if "members" in document:
            _merge_members(document["members"], by_mark)
        else:
            document["members"] = [
                {"mark": mark, **_without_none(change)}
                for mark, change in by_mark.items()
                if change is not None
            ]
        changes = {key: value for key, value in changes.items() if key != "members"}
    _merge(document, changes)


def _merge_members(members: MutableSequence[Any], changes: Mapping[str, Any]) -> None:
    for mark, change in changes.items():
        place = next((i for i, one in enumerate(members) if one.get("mark") == mark), None)
        if place is None and change is not None:
            _append(members, {"mark": mark, **_without_none(change)})
        elif place is not None and change is None:
            del members[place]
        elif place is not None:
            _merge(members[place], change)


def _merge(table: MutableMapping[str, Any], changes: Mapping[str, Any]) -> None:
    """Bring changes into a table; a value that is equal already is not touched."""
    if isinstance(changes, _Whole):
        for gone in [key for key in table if key not in changes]:
            del table[gone]
    for key, value in changes.items():
        old = table.get(key)
        if value is None:
            table.pop(key, None)
        elif isinstance(value, Mapping) and isinstance(old, MutableMapping):
            _merge(old, value)
        elif isinstance(value, list) and _tables(value) and isinstance(old, list) and _tables(old):
            _merge_tables(old, value)
        elif not _same(old, value):
            table[key] = _without_none(deepcopy(value))


def _merge_tables(old: MutableSequence[Any], new: list[Any]) -> None:
    """Make one list of tables equal another, entry by entry, so that comments stay."""
    for one, wanted in zip(old, new, strict=False):
        _merge(one, wanted)
    while len(old) > len(new):
        del old[len(old) - 1]
    for wanted in new[len(old) :]:
        _append(old, _without_none(wanted))


def _append(listed: MutableSequence[Any], entry: Mapping[str, Any]) -> None:
    """Add a table to a list of them, with a blank line between where the list is of headers."""
    from tomlkit import nl
    from tomlkit.items import AoT, Table

    before = listed[-1] if listed else None
    listed.append(entry)
    added = listed[-1]
    if isinstance(listed, AoT) and isinstance(before, Table) and isinstance(added, Table):
        if before.as_string().endswith(("\n\n", "\n\r\n")):
            added.append(None, nl())
        else:
            added.trivia.indent = "\n"


def _tables(value: list[Any]) -> bool:
    return bool(value) and all(isinstance(one, Mapping) for one in value)


def _same(old: Any, new: Any) -> bool:
    """Whether values are equal and of one kind: 1, 1.0 and true are three things in TOML."""
    kinds = [(isinstance(one, bool), isinstance(one, float)) for one in (old, new)]
    return bool(kinds[0] == kinds[1] and old == new)


def _without_none(value: Any) -> Any:
    if isinstance(value, Mapping):
        return {key: _without_none(one) for key, one in value.items() if one is not None}
    return value
