"""Weld metals and their nominal tensile strength, from memory."""

from __future__ import annotations

from dataclasses import dataclass

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean


@dataclass(frozen=True)
class WeldMetal:
    """A weld metal: nominal tensile strength in MPa."""

    name: str
    f_uw: float
    source: str


_OLD = "NZS 3404:1997, from memory, sure"
# Not in NZS 3404:1997, whose table has the two above; the cousin AS 4100 took them up in 2012.
_NEW = "AS/NZS 4855 classes as in AS 4100:1998 with Amendment 1:2012, from memory, fairly sure"

METALS: dict[str, WeldMetal] = {
    metal.name: metal
    for metal in (
        WeldMetal("E41XX", 410.0, _OLD),
        WeldMetal("W40X", 410.0, _OLD),
        WeldMetal("E48XX", 480.0, _OLD),
        WeldMetal("W50X", 480.0, _OLD),
        WeldMetal("B-E43XX", 430.0, _NEW),
        WeldMetal("B-E49XX", 490.0, _NEW),
    )
}


def weld_metal(name: str) -> WeldMetal:
    """A weld metal by its designation: "E48XX".

    Raises
    ------
    InputError, DataNotFoundError
    """
    if not isinstance(name, str):
        raise InputError(f"metal: got {name!r}; name it, for example 'E48XX'")
    found = METALS.get(name.strip().upper())
    if found is None:
        raise DataNotFoundError(
            f"metal: {name!r} is not on offer; there are {', '.join(METALS)}."
            + did_you_mean(name, METALS)
        )
    return found
