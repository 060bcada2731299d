"""What a calculation was asked: the member, its force, the standard; and its fields by name."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, fields, is_dataclass
from functools import lru_cache
from typing import Any

from tensionlib.calculation.result import Calculation
from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.joints.ends import Welded
from tensionlib.members.member import Member
from tensionlib.quantities import METRIC, Quantity, View

# Parts of a brief whose own fields have names: "end.plate.thickness".
_PARTS = ("end", "far_end", "plate", "shape", "hanger", "across", "overstrength")


@dataclass(frozen=True)
class Brief:
    """A design yet to be made: what `design()` takes, kept together.

    A field goes by its full name, "end.plate.thickness", or by any ending of it that no other
    field has, "plate.thickness" or "pitch".

    Parameters
    ----------
    member : Member
    force : force
        Design tension force.
    standard : str
    service : force, optional
    origin : str
        Who says the force.
    view : View
    """

    member: Member
    force: Quantity | str
    standard: str = "NZS 3404"
    service: Quantity | str | None = None
    origin: str = "given"
    view: View = METRIC

    @classmethod
    def of(cls, asked: Brief | Calculation | Member, force: Quantity | str | None = None) -> Brief:
        """A brief, the brief of a calculation, or of a member and its force.

        Raises
        ------
        InputError
            For a calculation of a working of the user's own, which no brief can make again, a
            member without a force, or anything else.
        """
        if isinstance(asked, Calculation):
            if asked.brief is None:
                raise InputError(
                    f"calculation of {asked.heading.mark}: its force comes from a working of your"
                    " own; give the member and the force as a quantity"
                )
            asked = asked.brief
        if isinstance(asked, Member):
            if force is None:
                raise InputError("force: missing; a member needs its force, for example '285 kN'")
            return cls(asked, force)
        if not isinstance(asked, Brief):
            raise InputError(f"got {asked!r}; a Brief, a calculation, or a member and a force")
        return asked if force is None else asked.but({"force": force})

    def design(self) -> Calculation:
        """The calculation. Raises as `design`."""
        # Here, since design() hands its calculation the brief it came from.
        from tensionlib.members.design import design

        return design(
            self.member,
            self.force,
            standard=self.standard,
            service=self.service,
            origin=self.origin,
            view=self.view,
        )

    # Fields by name -----------------------------------------------------------------------

    def names(self) -> tuple[str, ...]:
        """Full names of all the fields this brief has."""
        return ("force", "standard", "service", *_names(self.member, ""))

    def full_name(self, name: str) -> str:
        """The one field a name stands for. Raises DataNotFoundError for none or several."""
        names = self.names()
        if name in names:
            return name
        found = [full for full in names if full.endswith("." + name)]
        if len(found) == 1:
            return found[0]
        if found:
            raise DataNotFoundError(f"field: {name!r} could be {', '.join(map(repr, found))}")
        endings = {full.rpartition(".")[2] for full in names} | set(names)
        raise DataNotFoundError(
            f"field: {name!r} is not in the brief of {self.member.mark}."
            + did_you_mean(str(name), endings)
        )

    def value(self, name: str) -> Any:
        """What a field holds: a quantity, a number, a word, or None where it is left out."""
        holder: Any = self
        full = self.full_name(name)
        if full.partition(".")[0] not in ("force", "standard", "service"):
            holder = self.member
        for part in full.split("."):
            holder = getattr(holder, part)
        return holder

    def but(self, changes: Mapping[str, Any]) -> Brief:
        """A brief with some fields changed, all at once.

        Two weld runs of one length stay so when only the first is changed.

        Raises
        ------
        DataNotFoundError
            For a name that stands for no field or several.
        UnitError, InputError
            As the member and its ends, for a value they refuse.
        """
        mine: dict[str, Any] = {}
        members: dict[str, Any] = {}
        for name, value in changes.items():
            full = self.full_name(name)
            here = mine if full in ("force", "standard", "service") else members
            if full in here:
                raise InputError(f"field: {full!r} is changed twice")
            here[full] = value
        member = changed(self.member, members) if members else self.member
        return Brief(
            member=member,
            force=mine.get("force", self.force),
            standard=mine.get("standard", self.standard),
            service=mine.get("service", self.service),
            origin=self.origin,
            view=self.view,
        )


def _names(holder: Any, before: str) -> Iterator[str]:
    for name in _fields(holder.__class__):
        yield before + name
        value = getattr(holder, name)
        if name in _PARTS and is_dataclass(value):
            yield from _names(value, f"{before}{name}.")


@lru_cache(maxsize=64)
def _fields(kind: Any) -> tuple[str, ...]:
    return tuple(f.name for f in fields(kind))


def changed(holder: Any, changes: Mapping[str, Any]) -> Any:
    """The same object with fields changed, by names such as "plate.thickness" below it."""
    values = {name: getattr(holder, name) for name in _fields(holder.__class__)}
    below: dict[str, dict[str, Any]] = {}
    for name, value in changes.items():
        first, _, rest = name.partition(".")
        if rest:
            below.setdefault(first, {})[rest] = value
        else:
            values[first] = value
    for first, inner in below.items():
        values[first] = changed(values[first], inner)
    if (
        isinstance(holder, Welded)
        and "length_1" in changes
        and "length_2" not in changes
        and holder.length_1 == holder.length_2
    ):
        values["length_2"] = None
    return type(holder)(**values)
