"""Symbols of a standard or of a project, and the notation that holds them."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.quantities import Role


@dataclass(frozen=True, slots=True)
class Source:
    """Where a formula or a number comes from.

    `name` is the full citation ("NZS 3404:Part 1:1997"), `short` how prose names it, and `known`
    how the library knows what it says: "from memory", "read in a printed copy", "user's input".
    """

    name: str
    short: str
    known: str


@dataclass(frozen=True, slots=True)
class Symbol:
    """One symbol: its Python name, its LaTeX, what role it plays and what it means.

    `name` is the identifier formulas use for it (``N_star``); `text` is how plain text writes it
    (``N*``), the same as the name unless given.
    """

    name: str
    latex: str
    role: Role
    meaning: str
    text: str = ""

    def __post_init__(self) -> None:
        if not self.name.isidentifier():
            raise InputError(
                f"symbol name: got {self.name!r}; a Python identifier is due, for example 'N_star'"
                " (give text='N*' for how plain text writes it)"
            )
        if not self.text:
            object.__setattr__(self, "text", self.name)


def _as_numbered(clause: str) -> str:
    return clause


class Notation:
    """The symbols of one standard, one calculation or one project: one meaning a symbol.

    Parameters
    ----------
    source : Source
        What the formulas written in this notation come from.
    symbols : iterable of Symbol
    cite : callable, optional
        How a clause of the common formulas is numbered here; the same number unless given.

    Raises
    ------
    InputError
        When two symbols share a name or a LaTeX form: a reader could not tell them apart.
    """

    def __init__(
        self,
        source: Source,
        symbols: Iterable[Symbol],
        *,
        cite: Callable[[str], str] | None = None,
    ) -> None:
        self.source = source
        self.cite = cite or _as_numbered
        self._symbols: dict[str, Symbol] = {}
        seen: dict[str, str] = {}
        for symbol in symbols:
            other = seen.get(symbol.latex)
            if symbol.name in self._symbols or other is not None:
                raise InputError(
                    f"notation of {source.short}: symbol {symbol.name!r} stands twice"
                    + (f" (it prints like {other!r})" if other else "")
                    + "; one symbol has one meaning"
                )
            self._symbols[symbol.name] = symbol
            seen[symbol.latex] = symbol.name

    def __getitem__(self, name: str) -> Symbol:
        try:
            return self._symbols[name]
        except KeyError:
            raise DataNotFoundError(
                f"symbol: {name!r} is not in the notation of {self.source.short}."
                + did_you_mean(name, self._symbols)
            ) from None

    def __iter__(self) -> Iterator[Symbol]:
        return iter(self._symbols.values())

    def __contains__(self, name: object) -> bool:
        return name in self._symbols


def project_notation(*symbols: Symbol, name: str = "project notation") -> Notation:
    """The notation of a user's own formulas, their source being the user."""
    return Notation(Source(name, name, "user's input"), symbols)
