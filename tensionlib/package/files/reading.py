"""Taking a user's file from the disk: its size, its kind and its characters."""

from __future__ import annotations

import codecs
import os
import stat
from pathlib import Path

from tensionlib.errors import did_you_mean

LARGEST_FILE = 20_000_000
"""Bytes; a design file or schedule above this size is refused unread."""


class UnreadableError(Exception):
    """Why a file cannot be read, and the line if it is known. Callers give it a place."""

    def __init__(self, reason: str, line: int | None = None) -> None:
        super().__init__(reason)
        self.reason = reason
        self.line = line


def read_bytes(path: Path) -> bytes:
    """Read a whole file of at most `LARGEST_FILE` bytes."""
    try:
        found = path.stat()
        if stat.S_ISDIR(found.st_mode):
            raise UnreadableError("is a folder; name a file in it")
        if not stat.S_ISREG(found.st_mode):
            raise UnreadableError("is not an ordinary file")
        with path.open("rb") as stream:
            data = stream.read(LARGEST_FILE + 1)
    except FileNotFoundError:
        raise UnreadableError(f"there is no such file.{_near(path)}".rstrip(".")) from None
    except OSError as error:
        raise UnreadableError(f"cannot be read ({error.strerror or error})") from None
    if len(data) > LARGEST_FILE:
        raise UnreadableError(
            f"holds {max(found.st_size, len(data))} bytes; at most {LARGEST_FILE} are read"
        )
    return data


def decode(data: bytes, *, utf16: bool = False) -> str:
    """Turn bytes into text: UTF-8 with or without a byte order mark, and UTF-16 if allowed."""
    if data.startswith((codecs.BOM_UTF16_LE, codecs.BOM_UTF16_BE)):
        if not utf16:
            raise UnreadableError("is in UTF-16; save it as UTF-8")
        try:
            text = data.decode("utf-16")
        except UnicodeDecodeError:
            raise UnreadableError("is not whole UTF-16; save it again as UTF-8") from None
    else:
        data = data.removeprefix(codecs.BOM_UTF8)
        try:
            text = data.decode("utf-8")
        except UnicodeDecodeError as error:
            line = data.count(b"\n", 0, error.start) + 1
            raise UnreadableError(
                f"byte 0x{data[error.start]:02X} is not UTF-8 text; save the file as UTF-8", line
            ) from None
    if "\0" in text:
        line = text.count("\n", 0, text.index("\0")) + 1
        raise UnreadableError(
            "holds a NUL character, so it is no plain text or UTF-16 without its mark;"
            " save it as UTF-8",
            line,
        )
    return text


def _near(path: Path) -> str:
    try:
        names = [name for name in os.listdir(path.parent) if name.endswith(path.suffix)]
    except OSError:
        return ""
    return did_you_mean(path.name, names)
