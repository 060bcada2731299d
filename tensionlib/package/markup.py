"""Markdown and TeX to the typesetter's markup: one run of pandoc for a whole package."""

from __future__ import annotations

import hashlib
import json
import subprocess
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from tensionlib.errors import InputError, TensionlibError

TEMPLATES = Path(__file__).with_name("templates")


@dataclass(frozen=True, slots=True)
class Heading:
    """A heading of the prose: 1 is the highest level."""

    level: int
    text: str


@dataclass(frozen=True, slots=True)
class Image:
    """A picture the prose asks for; the markup calls ``picture(index)`` in its place."""

    source: str
    alt: str


@dataclass(frozen=True, slots=True)
class Converted:
    """One cell of markdown: its markup and what stands in it."""

    markup: str
    images: tuple[Image, ...]
    headings: tuple[Heading, ...]


class Formulas:
    """The formulas of a package, each kept once, and the cell that first shows it."""

    def __init__(self) -> None:
        self._places: dict[str, int] = {}
        self._cells: list[int] = []

    def index(self, tex: str, cell: int) -> int:
        """The place of the formula `tex` in the list of formulas."""
        tex = " ".join(tex.split())
        if tex not in self._places:
            self._places[tex] = len(self._places)
            self._cells.append(cell)
        return self._places[tex]

    @property
    def tex(self) -> list[str]:
        return list(self._places)

    def cell(self, index: int) -> int:
        """The number of the cell that first shows the formula at `index`."""
        return self._cells[index]


def convert(
    prose: Sequence[tuple[int, str]], formulas: Formulas
) -> tuple[list[Converted], list[str]]:
    """The markup of each (cell number, markdown) and of each formula, the latter without ``$``.

    Raw HTML and TeX become literal text, links other than http, https and mailto plain text.

    Raises
    ------
    InputError
        For mathematics that cannot be set, naming the cell.
    TensionlibError
        When pandoc is missing or fails.
    """
    cells = [markdown for _, markdown in prose]
    # Nobody can write a text that holds the fingerprint of all text, itself included.
    facts = json.dumps([cells, formulas.tex]).encode()
    answer = _pandoc(
        {
            "nonce": hashlib.sha256(facts).hexdigest(),
            "cells": cells,
            "formulas": formulas.tex,
        }
    )
    for (cell, _), one in zip(prose, answer["cells"], strict=True):
        if one["problems"]:
            raise InputError(f"cell {cell}: {one['problems'][0]}")
    for index, problem in answer["problems"].items():
        raise InputError(f"cell {formulas.cell(int(index))}: {problem}")
    converted = [
        Converted(
            one["markup"],
            tuple(Image(**image) for image in one["images"]),
            tuple(Heading(**heading) for heading in one["headings"]),
        )
        for one in answer["cells"]
    ]
    written = [text.strip().removeprefix("$").removesuffix("$") for text in answer["formulas"]]
    return converted, written


def _pandoc(question: dict[str, Any]) -> Any:
    try:
        import pypandoc
    except ImportError as missing:
        raise TensionlibError(
            'setting a package needs pandoc: pip install "tensionlib[package]"'
        ) from missing
    try:
        ran = subprocess.run(
            [pypandoc.get_pandoc_path(), "lua", str(TEMPLATES / "markup.lua")],
            input=json.dumps(question).encode(),
            capture_output=True,
            check=True,
        )
    except OSError as missing:
        raise TensionlibError(
            f'pandoc cannot be started ({missing}): pip install "tensionlib[package]"'
        ) from missing
    except subprocess.CalledProcessError as failed:
        raise TensionlibError(
            "pandoc failed; 3.9 or later is due, as pypandoc_binary brings it: "
            + failed.stderr.decode(errors="replace").strip()
        ) from failed
    return json.loads(ran.stdout)
