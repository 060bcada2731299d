"""Standards, one folder each. A folder found here, or an entry point, is a standard on offer."""

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
    folders = [module.name for module in pkgutil.iter_modules(__path__) if module.ispkg]
    return tuple(sorted({*folders, *(point.name for point in entry_points(group=GROUP))}))


@cache
def standard(name: str) -> Standard:
    """A standard by its name: "NZS 3404", "nzs3404".

    Raises
    ------
    DataNotFoundError
        For a standard that is not on offer, with the nearest names.
    """
    if not isinstance(name, str):
        raise InputError(f"standard: got {name!r}; name one, for example 'NZS 3404'")
    key = _key(name)
    on_offer = names()
    if key not in on_offer:
        raise DataNotFoundError(
            f"standard: {name!r} is not on offer; there are {', '.join(on_offer)}."
            + did_you_mean(key, on_offer)
        )
    for point in entry_points(group=GROUP):
        if point.name == key:
            found = point.load()
            break
    else:
        found = import_module(f"{__name__}.{key}").STANDARD
    if not isinstance(found, Standard):
        raise InputError(f"standard {name!r}: its STANDARD is {found!r}, not a Standard")
    return found
