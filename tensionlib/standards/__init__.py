"""Standards, one folder each. A folder found here, or an entry point, is a standard on offer.

A folder `common_…` is no standard: it holds what several of them say alike.
"""

from __future__ import annotations

import pkgutil
from functools import cache
from importlib import import_module
from importlib.metadata import entry_points

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.standards.interface import Standard

__all__ = ["Standard", "names", "standard"]

GROUP = "tensionlib.standards"


def _key(name: str) -> str:
    return "".join(c for c in name.lower() if c.isalnum())


def names() -> tuple[str, ...]:
    """Keys of the standards on offer: folders of this package and installed entry points."""
    folders = [
        module.name
        for module in pkgutil.iter_modules(__path__)
        if module.ispkg and not module.name.startswith("common_")
    ]
    return tuple(sorted({*folders, *(point.name for point in entry_points(group=GROUP))}))


@cache
def standard(name: str) -> Standard:
    """A standard by its name, with its edition or without: "NZS 3404", "AS 4100:1998".

    Without an edition it is the newest one on offer.

    Raises
    ------
    DataNotFoundError
        For a standard or an edition that is not on offer, with those that are.
    """
    if not isinstance(name, str):
        raise InputError(f"standard: got {name!r}; name one, for example 'NZS 3404'")
    asked, on_offer = _key(name), names()
    key = next((k for k in sorted(on_offer, key=len, reverse=True) if asked.startswith(k)), "")
    if not key:
        raise DataNotFoundError(
            f"standard: {name!r} is not on offer; there are {', '.join(on_offer)}."
            + did_you_mean(asked, on_offer)
        )
    found = _loaded(key)
    edition = asked.removeprefix(key).removeprefix("part1")
    if not edition or edition == found.edition:
        return found
    for other in found.others:
        if other.edition == edition:
            return other
    editions = sorted(each.edition for each in (found, *found.others))
    raise DataNotFoundError(
        f"standard: {name!r} asks for an edition that is not on offer; {found.source.short} is"
        f" there in the edition{'s' if len(editions) > 1 else ''} {', '.join(editions)}"
    )


def _loaded(key: str) -> Standard:
    for point in entry_points(group=GROUP):
        if point.name == key:
            found = point.load()
            break
    else:
        found = import_module(f"{__name__}.{key}").STANDARD
    if not isinstance(found, Standard):
        raise InputError(f"standard {key!r}: its STANDARD is {found!r}, not a Standard")
    return found
