"""The checks that a field passes whether it stands in a design file or in a schedule."""

from __future__ import annotations

import unicodedata
from collections.abc import Callable
from dataclasses import dataclass

from tensionlib.errors import InputError, UnitError
from tensionlib.package.files.problems import reason_of, shown
from tensionlib.quantities import FORCE, LENGTH, Quantity, door

Check = Callable[[str], object]

LENGTH_EXAMPLE = "4.6 m"
FORCE_EXAMPLE = "285 kN"


@dataclass(frozen=True)
class KnownNames:
    """What decides whether a name is known: each raises DataNotFoundError for one that is not.

    `options` are the options a design file may state under its standard.
    """

    section: Check
    steel: Check
    bolts: Check
    metal: Check
    standard: Check
    options: tuple[str, ...] = ()

    @classmethod
    def of_library(cls) -> KnownNames:
        """The names of the library's own catalogues."""
        from tensionlib.standards import standard
        from tensionlib.steel import bolt, grade, section, weld_metal

        return cls(section, grade, bolt, weld_metal, standard)

    def check(self, field: str, name: str) -> None:
        """Look up a section, steel, bolt, weld metal or standard; other fields name nothing.

        Raises
        ------
        DataNotFoundError
            With the nearest names.
        """
        looked_up = {
            "section": self.section,
            "steel": self.steel,
            "sleeve_steel": self.steel,
            "bolts": self.bolts,
            "metal": self.metal,
            "standard": self.standard,
        }
        if field in looked_up:
            looked_up[field](name)


def text_block(text: str) -> str:
    """Text of any number of lines, kept to the letter; control characters are refused."""
    for character in text:
        if unicodedata.category(character) in ("Cc", "Cs") and character not in "\n\r\t":
            raise InputError(
                f"holds the control character U+{ord(character):04X}, which cannot be printed;"
                " take it out"
            )
    return text


def text_line(text: str) -> str:
    """Text of one line, kept to the letter."""
    text_block(text)
    if any(character in "\n\r\t\u2028\u2029" for character in text):
        raise InputError(f"got {shown(text)}; one line of text without tabs is due")
    return text


def named(text: str) -> str:
    """One line of text that is not blank."""
    if not text_line(text).strip():
        raise InputError("is blank; text is due")
    return text


def take_length(field: str, value: object, example: str = LENGTH_EXAMPLE) -> Quantity:
    """A length above zero.

    Raises
    ------
    InputError
        For anything else, with the reason and an example that works.
    """
    return _taken(lambda: door(field, value, LENGTH, above=0.0, example=repr(example)), field)


def take_force(field: str, value: object) -> Quantity:
    """A design tension force, zero or more; compression is refused."""
    force = _taken(lambda: door(field, value, FORCE, example=repr(FORCE_EXAMPLE)), field)
    if force.internal < 0.0:
        raise InputError(
            f"got {force}, a compression force; this tool designs tension, and compression enters"
            " only as the reversal case of a gusset. Give the tension force, for example"
            f" {FORCE_EXAMPLE!r}"
        )
    return force


def _taken(through_door: Callable[[], Quantity], field: str) -> Quantity:
    try:
        return through_door()
    except (UnitError, InputError) as error:
        raise InputError(reason_of(error, field)) from None
