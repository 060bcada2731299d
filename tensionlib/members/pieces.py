"""Pieces: what a walk is given, made part by part, each part naming the fields it reads.

A single design merges all the pieces of a member. A study of many alternatives makes each piece
once for each different set of the fields it names and gathers rows from the results; it gives a
piece only those fields, so that one that read another would fail and not go wrong.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import dataclass
from typing import Any

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.members.beside import Across, Overstrength
from tensionlib.quantities import Quantity
from tensionlib.standards import Standard
from tensionlib.steel import Grade, Section

NOTHING = Inputs({}, {})

# What the titles of an end's parts and the keys of its inputs begin with, by how many ends differ.
END_NAMES = {
    1: (("", "end: "),),
    2: (("End 1: ", "end 1: "), ("End 2: ", "end 2: ")),
}


@dataclass(frozen=True)
class Given:
    """The fields pieces read: of the member, and of the end at hand.

    `label` is what the titles of the end's parts begin with, `prefix` what its keys begin with.
    """

    standard: Standard
    section: Section
    steel: Grade
    length: Quantity
    across: Across | None
    overstrength: Overstrength | None
    ties: Quantity | None
    service: Number | None
    end: Any = None
    label: str = ""
    prefix: str = "member: "


@dataclass(frozen=True)
class Piece:
    """Part of what a walk is given.

    `reads` names the fields of `Given` that `make` reads, those of the end as "end.bolts". A
    piece that only refuses what does not go together makes nothing.
    """

    make: Callable[[Given], Inputs]
    reads: tuple[str, ...]


def refuses(check: Callable[[Any], None], of_end: tuple[str, ...]) -> Piece:
    """A piece that only refuses fields of an end that do not go together."""

    def make(given: Given) -> Inputs:
        check(given.end)
        return NOTHING

    return Piece(make, tuple(f"end.{name}" for name in of_end))


def gather(pieces: Iterable[Piece], given: Given) -> Inputs:
    """The pieces of one member or end, merged in their order. Raises what they raise."""
    return merged([piece.make(given) for piece in pieces], given.prefix)


def merged(made: Iterable[Inputs], prefix: str) -> Inputs:
    """One `Inputs` of several, which share no name but those of parts."""
    choices: dict[str, str] = {}
    numbers: dict[str, Number] = {}
    tables: dict[str, Any] = {}
    parts: dict[str, tuple[Inputs, ...]] = {}
    words: dict[str, str] = {}
    for one in made:
        choices.update(one.choices)
        numbers.update(one.own)
        tables.update(one.tables)
        words.update(one.words)
        for name, more in one.parts.items():
            parts[name] = parts.get(name, ()) + more
    return Inputs(choices, numbers, tables, prefix, parts, words)
