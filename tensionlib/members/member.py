"""A tension member as the user states it."""

from __future__ import annotations

from dataclasses import dataclass, fields
from typing import Any

from tensionlib.errors import InputError, did_you_mean
from tensionlib.joints.ends import Bolted, Welded
from tensionlib.joints.pattern_end import BoltedPattern, as_pattern
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.welded_runs import WeldedRuns
from tensionlib.members.beside import Across, Overstrength
from tensionlib.quantities import LENGTH, Quantity, door
from tensionlib.steel import Grade, Section, grade, section

End = Bolted | BoltedPattern | Welded | WeldedRuns | Pinned | Threaded


def laid_out(end: End, section: Section) -> End:
    """An end as it is designed: a regular bolted one on an outlined gusset, hole by hole."""
    if isinstance(end, Bolted) and end.plate.shape is not None:
        return as_pattern(end, section)
    return end


@dataclass(frozen=True)
class Member:
    """A tension member with its two ends.

    Parameters
    ----------
    mark : str
        The member's mark on the drawings: "RB1".
    section : str or Section
        Designation ("150x90x10 UA") or a section of your own.
    steel : str or Grade
        Grade of the section: "AS/NZS 3679.1 300".
    length : length
    end : Bolted, BoltedPattern, Welded, WeldedRuns, Pinned or Threaded
        The end connection, at both ends unless `far_end` differs.
    far_end : the same, optional
    title : str
        What the member is: "roof brace, grid B".
    across : Across, optional
        Loads across the member and offsets of its force: tension with bending, and sag.
    overstrength : Overstrength, optional
        For a brace that yields in an earthquake.
    ties : length, optional
        Spacing of the bolts or welds that tie the two components of a pair together.

    Raises
    ------
    UnitError, InputError, DataNotFoundError
        Naming the field, what came, and what is accepted.
    """

    mark: str
    section: str | Section
    steel: str | Grade
    length: Quantity | str
    end: End
    far_end: End | None = None
    title: str = ""
    across: Across | None = None
    overstrength: Overstrength | None = None
    ties: Quantity | str | None = None

    def __post_init__(self) -> None:
        for name in ("mark", "title"):
            if not isinstance(getattr(self, name), str):
                raise InputError(f"{name}: got {getattr(self, name)!r}; text is due, as 'RB1'")
        if not self.mark.strip():
            raise InputError("mark: empty; give the member's mark, for example 'RB1'")
        object.__setattr__(
            self, "length", door("length", self.length, LENGTH, above=0.0, example="4600 mm")
        )
        if isinstance(self.section, str):
            object.__setattr__(self, "section", section(self.section))
        elif not isinstance(self.section, Section):
            raise InputError(
                f"section: got {self.section!r}; a designation is due, for example '150x90x10 UA'"
            )
        if isinstance(self.steel, str):
            object.__setattr__(self, "steel", grade(self.steel))
        elif not isinstance(self.steel, Grade):
            raise InputError(
                f"steel: got {self.steel!r}; a grade is due, for example 'AS/NZS 3679.1 300'"
            )
        for name, due in (("across", Across), ("overstrength", Overstrength)):
            value = getattr(self, name)
            if value is not None and not isinstance(value, due):
                raise InputError(f"{name}: got {value!r}; {due.__name__}(...) is due")
        if self.ties is not None:
            ties = door("ties", self.ties, LENGTH, above=0.0, example="1500 mm")
            object.__setattr__(self, "ties", ties)
            if not self.profile.shape.startswith("double "):
                raise InputError(
                    f"ties: given for {self.profile.designation}, which is one piece; leave it out"
                )
        for name in ("end", "far_end"):
            end = getattr(self, name)
            if not isinstance(end, End) and not (end is None and name == "far_end"):
                raise InputError(f"{name}: got {end!r}; an end is due, for example Bolted(...)")

    @property
    def ends(self) -> tuple[End, ...]:
        """The distinct ends as they are designed: one when both are the same.

        A regular bolted end on a gusset with an outline of its own is laid out hole by hole, so
        that tear-out runs to the gusset's own edges.
        """
        if self.far_end is None or self.far_end == self.end:
            return (self._laid_out(self.end),)
        return (self._laid_out(self.end), self._laid_out(self.far_end))

    def _laid_out(self, end: End) -> End:
        return laid_out(end, self.profile)

    @property
    def profile(self) -> Section:
        """The section, looked up."""
        assert isinstance(self.section, Section)
        return self.section

    @property
    def material(self) -> Grade:
        """The section's grade, looked up."""
        assert isinstance(self.steel, Grade)
        return self.steel

    def but(self, **changes: Any) -> Member:
        """A copy with some fields changed. Raises InputError for a name that is not a field."""
        names = [f.name for f in fields(self)]
        for name in changes:
            if name not in names:
                raise InputError(
                    f"Member: {name!r} is not a field; fields are {', '.join(names)}."
                    + did_you_mean(name, names)
                )
        return Member(**{name: getattr(self, name) for name in names} | changes)
