"""Where the keys of a TOML text stand: from a path such as ("ends", "A", "pitch") to its line."""

from __future__ import annotations

import json
import re
from bisect import bisect_right

Path = tuple[str | int, ...]

_BLANK = re.compile(r"(?:[ \t\r\n]|#[^\n]*)*")
_SPACE = re.compile(r"[ \t]*")
_BARE_KEY = re.compile(r"[A-Za-z0-9_-]+")
_STRING = re.compile(
    r'"""(?:[^\\]|\\.)*?"{3,5}(?!")'
    r"|'''.*?'{3,5}(?!')"
    r'|"(?:[^"\\\n]|\\.)*"'
    r"|'[^'\n]*'",
    re.DOTALL,
)
_PLAIN_VALUE = re.compile(r"[^,\]}#\r\n]*")
_ESCAPE = re.compile(r'\\(?:u([0-9A-Fa-f]{4})|U([0-9A-Fa-f]{8})|(["\\bfnrt]))')
_ESCAPED = {'"': '"', "\\": "\\", "b": "\b", "f": "\f", "n": "\n", "r": "\r", "t": "\t"}


class Lines:
    """The line of every key, table and list entry of a TOML text that a parser has accepted."""

    def __init__(self, text: str) -> None:
        self._text = text
        self._starts = [0, *(found.end() for found in re.finditer("\n", text))]
        self._offsets: dict[Path, int] = {(): 0}
        self._counts: dict[Path, int] = {}
        self._scan()

    def line(self, path: Path) -> int:
        """The line (from 1) of a key path, or of the nearest table that holds it."""
        while path not in self._offsets:
            path = path[:-1]
        return bisect_right(self._starts, self._offsets[path])

    def has(self, path: Path) -> bool:
        """Whether the text states this very path."""
        return path in self._offsets

    def _scan(self) -> None:
        text = self._text
        table: Path = ()
        at = self._skip(_BLANK, 0)
        while at < len(text):
            start = at
            if text[at] == "[":
                listed = text.startswith("[[", at)
                names, at = self._key(at + (2 if listed else 1))
                table = self._table(names, listed)
                self._mark(table, start)
                at = self._skip(_SPACE, at) + (2 if listed else 1)
            else:
                at = self._pair(table, at)
            at = self._skip(_BLANK, at)

    def _skip(self, pattern: re.Pattern[str], at: int) -> int:
        found = pattern.match(self._text, at)
        return found.end() if found else at

    def _mark(self, path: Path, at: int) -> None:
        """Keep the first place of a path, and of the tables it implies."""
        for length in range(1, len(path) + 1):
            self._offsets.setdefault(path[:length], at)

    def _table(self, names: tuple[str, ...], listed: bool) -> Path:
        """The path of a header: a list of tables stands for its newest entry."""
        path: Path = ()
        for place, name in enumerate(names):
            path = (*path, name)
            if listed and place == len(names) - 1:
                self._counts[path] = self._counts.get(path, 0) + 1
            if path in self._counts:
                path = (*path, self._counts[path] - 1)
        return path

    def _key(self, at: int) -> tuple[tuple[str, ...], int]:
        names = []
        while True:
            start = self._skip(_SPACE, at)
            quoted = self._text[start] in "\"'"
            end = self._skip(_STRING if quoted else _BARE_KEY, start)
            name = self._text[start:end]
            names.append(_unquoted(name) if quoted else name)
            at = self._skip(_SPACE, end)
            if self._text[at] != ".":
                return tuple(names), at
            at += 1

    def _pair(self, table: Path, at: int) -> int:
        start = at
        names, at = self._key(at)
        path = (*table, *names)
        self._mark(path, start)
        return self._value(path, self._skip(_SPACE, at + 1))

    def _value(self, path: Path, at: int) -> int:
        text = self._text
        if text[at] in "\"'":
            return self._skip(_STRING, at)
        if text[at] not in "[{":
            return self._skip(_PLAIN_VALUE, at)
        close = "]" if text[at] == "[" else "}"
        at = self._skip(_BLANK, at + 1)
        entry = 0
        while text[at] != close:
            if close == "}":
                at = self._pair(path, at)
            else:
                self._mark((*path, entry), at)
                at = self._value((*path, entry), at)
                entry += 1
            at = self._skip(_BLANK, at)
            if text[at] == ",":
                at = self._skip(_BLANK, at + 1)
        return at + 1


def _unquoted(written: str) -> str:
    inner = written[1:-1]
    if written[0] == "'":
        return inner
    return _ESCAPE.sub(
        lambda found: _ESCAPED[found[3]] if found[3] else chr(int(found[1] or found[2], 16)), inner
    )


def dotted(path: Path) -> str:
    """Write a key path for a reader: "ends.A.pitch", "members[2].force" (entries from 1)."""
    text = ""
    for step in path:
        if isinstance(step, int):
            text += f"[{step + 1}]"
        else:
            name = step if _BARE_KEY.fullmatch(step) else json.dumps(step, ensure_ascii=False)
            text += f".{name}" if text else name
    return text
