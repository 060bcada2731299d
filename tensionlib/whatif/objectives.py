"""What alternatives are compared by: mass, bolts, weld, gusset, and cost by the user's rates."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, fields
from types import SimpleNamespace
from typing import cast

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.members.brief import Brief
from tensionlib.members.member import laid_out
from tensionlib.members.pieces import Given
from tensionlib.quantities import factor
from tensionlib.steel import bolt
from tensionlib.whatif.take_off import MEMBER_MASS, OF_END, Term


@dataclass(frozen=True)
class Rates:
    """Unit rates of the user's own: the library has no prices.

    Parameters
    ----------
    section : number
        For a kilogram of the member.
    plate : number
        For a kilogram of gusset.
    bolt : number, or mapping of designation to number
        For a bolt in place. A designation a mapping does not have is refused.
    hole : number
        For a hole drilled through one ply.
    weld : number
        For a cubic centimetre of fillet weld.
    currency : str
        What the rates are in; printed beside the cost.

    Raises
    ------
    InputError
        For a rate below zero or without a number.
    """

    section: float = 0.0
    plate: float = 0.0
    bolt: float | Mapping[str, float] = 0.0
    hole: float = 0.0
    weld: float = 0.0
    currency: str = "units of cost"

    def __post_init__(self) -> None:
        for field in fields(self):
            value = getattr(self, field.name)
            if field.name == "currency":
                if not isinstance(value, str) or not value.strip():
                    raise InputError(f"currency: got {value!r}; name it, for example 'NZD'")
            elif isinstance(value, Mapping):
                kept = {
                    bolt(name).designation: factor(f"bolt, {name}", rate, at_least=0.0)
                    for name, rate in value.items()
                }
                object.__setattr__(self, "bolt", kept)
            else:
                object.__setattr__(self, field.name, factor(field.name, value, at_least=0.0))

    def of_bolt(self, name: str) -> float:
        """The rate of a bolt. Raises DataNotFoundError for one without a rate."""
        if not isinstance(self.bolt, Mapping):
            return self.bolt
        designation = bolt(name).designation
        if designation not in self.bolt:
            raise DataNotFoundError(
                f"bolt: no rate for {designation}; there are rates for"
                f" {', '.join(self.bolt) or 'none'}"
            )
        return self.bolt[designation]


@dataclass(frozen=True)
class Objective:
    """A number to compare alternatives by: a term of the member, and terms of each end.

    `of_end` gives for a kind of end ("bolted", "welded", "" for others) the terms whose sum it is;
    `scale` turns it into `unit`.
    """

    name: str
    unit: str
    of_member: Term | None
    of_end: Callable[[str], tuple[Term, ...]]
    scale: float = 1.0

    @property
    def label(self) -> str:
        return f"{self.name} [{self.unit}]" if self.unit else self.name

    def __call__(self, brief: Brief) -> float:
        """The number of one brief."""
        member = brief.member
        total = 0.0
        if self.of_member is not None:
            total += self.of_member.make(_given(section=member.profile, length=member.length))
        ends = (member.end, member.end if member.far_end is None else member.far_end)
        for end in ends:
            given = _given(section=member.profile, end=laid_out(end, member.profile))
            total += sum(term.make(given) for term in self.of_end(""))
        return total * self.scale


def _given(**held: object) -> Given:
    return cast(Given, SimpleNamespace(**held))


def _no_terms(kind: str) -> tuple[Term, ...]:
    return ()


def _quantity(name: str) -> Callable[[str], tuple[Term, ...]]:
    return lambda kind: (OF_END[kind][name],)


OBJECTIVES: dict[str, Objective] = {
    "mass": Objective("mass", "kg", MEMBER_MASS, _quantity("gusset mass")),
    "member mass": Objective("member mass", "kg", MEMBER_MASS, _no_terms),
    "bolts": Objective("bolts", "", None, _quantity("bolts")),
    "weld volume": Objective("weld volume", "cm³", None, _quantity("weld volume"), 1e-3),
    "gusset area": Objective("gusset area", "m²", None, _quantity("gusset area"), 1e-6),
}
"""Objectives that need no rates. "mass" is that of the member and of its gussets."""


def cost(rates: Rates) -> Objective:
    """The cost of member, gussets, bolts, holes and welds by rates of one's own."""

    def priced(term: Term, rate: float) -> Term:
        return Term(lambda given: term.make(given) * rate, term.reads)

    def bolts(kind: str) -> Term:
        term = OF_END[kind]["bolts"]
        if not isinstance(rates.bolt, Mapping):
            return priced(term, rates.bolt)

        def make(given: Given) -> float:
            number = term.make(given)
            return number * rates.of_bolt(given.end.bolts) if number else 0.0

        reads = (*term.reads, "end.bolts") if kind == "bolted" else term.reads
        return Term(make, reads)

    def of_end(kind: str) -> tuple[Term, ...]:
        return (
            bolts(kind),
            priced(OF_END[kind]["holes"], rates.hole),
            priced(OF_END[kind]["weld volume"], rates.weld * 1e-3),
            priced(OF_END[kind]["gusset mass"], rates.plate),
        )

    return Objective("cost", rates.currency, priced(MEMBER_MASS, rates.section), of_end)


def objective(by: str | Rates | Objective) -> Objective:
    """An objective by its name, or the cost by rates. Raises DataNotFoundError for another."""
    if isinstance(by, Rates):
        return cost(by)
    if isinstance(by, Objective):
        return by
    if by not in OBJECTIVES:
        raise DataNotFoundError(
            f"by: got {by!r}; there are {', '.join(OBJECTIVES)}, or Rates(...)."
            + did_you_mean(str(by), OBJECTIVES)
        )
    return OBJECTIVES[by]
