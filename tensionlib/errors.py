"""The errors the library raises: one base, and children that also are Python's own kinds."""

from __future__ import annotations

from collections.abc import Iterable
from difflib import get_close_matches


class TensionlibError(Exception):
    """Base of every error the library raises on purpose."""


class UnitError(TensionlibError, TypeError):
    """A bare number where a dimension is due, or the wrong dimension."""


class InputError(TensionlibError, ValueError):
    """A value outside what its argument or field accepts."""


class OutOfScopeError(TensionlibError):
    """A clause or the library does not cover the case that was put to it."""


class DataNotFoundError(TensionlibError, LookupError):
    """A designation, grade, bolt or name that no table holds."""


class MissingExtraError(TensionlibError, ImportError):
    """A library of an optional extra that is not installed."""


def did_you_mean(given: str, known: Iterable[str], most: int = 3) -> str:
    """Say which known names stand nearest to `given`: " Did you mean 'a' or 'b'?", or nothing."""
    folded: dict[str, str] = {}
    for name in known:
        folded.setdefault(_fold(name), name)
    near = [folded[key] for key in get_close_matches(_fold(given), folded, n=most, cutoff=0.55)]
    if not near:
        return ""
    return " Did you mean " + " or ".join(repr(name) for name in near) + "?"


def _fold(name: str) -> str:
    return "".join(name.lower().replace("×", "x").split())
