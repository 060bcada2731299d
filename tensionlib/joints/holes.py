"""Holes of a bolted end as points: any pattern, and what was drilled in its place.

x runs along the member from its end into its body. y runs across an element from where its
gauges are set out: the heel of an angle's leg, the back of a channel for its flanges, the lower
outer face for a web, one edge of a flat or of an I's or tee's flange.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

from tensionlib.errors import InputError, did_you_mean
from tensionlib.joints.stated import Length, choice, in_mm
from tensionlib.quantities import LENGTH, count, door, quantity

KINDS = ("standard", "oversize", "short slot", "long slot")
SLOTS = ("along", "across")


@dataclass(frozen=True)
class Hole:
    """One hole.

    Parameters
    ----------
    mark : str
        What it is called on the drawing: "3".
    x, y : length
        Along the member from its end, and across the element; see the module.
    element : str
        The element it goes through, where that is not the one the end takes hold of.
    bolt : bool
        Whether a bolt of the joint stands in it.
    kind : str
        "standard", "oversize", "short slot" or "long slot": its size is the standard's.
    slot : str
        A slot's long side: "along" the force or "across" it.
    diameter : length, optional
        Its own diameter, of a round hole; the standard's for the bolt and kind unless given.
    """

    mark: str
    x: Length
    y: Length
    element: str = ""
    bolt: bool = True
    kind: str = "standard"
    slot: str = "along"
    diameter: Length | None = None

    def __post_init__(self) -> None:
        if not isinstance(self.mark, str) or not self.mark.strip():
            raise InputError(f"mark: got {self.mark!r}; a name is due, for example '3'")
        where = f"hole {self.mark}: "
        if not isinstance(self.element, str):
            raise InputError(f"{where}element: got {self.element!r}; its name is due, as 'web'")
        if not isinstance(self.bolt, bool):
            raise InputError(f"{where}bolt: got {self.bolt!r}; True or False is due")
        for name in ("x", "y"):
            value = door(where + name, getattr(self, name), LENGTH, above=0.0, example="60 mm")
            object.__setattr__(self, name, value)
        choice(where + "kind", self.kind, KINDS)
        choice(where + "slot", self.slot, SLOTS)
        if self.diameter is not None:
            if self.kind.endswith("slot"):
                raise InputError(f"{where}diameter: a slot's size is the standard's; leave it out")
            diameter = door(where + "diameter", self.diameter, LENGTH, above=0.0, example="22 mm")
            object.__setattr__(self, "diameter", diameter)


def _by(length: Length, argument: str) -> float:
    return float(door(argument, length, LENGTH, example="6 mm").internal)


@dataclass(frozen=True)
class Pattern:
    """Holes, each with its own mark. Made by `lines` or from holes; edits give a new pattern.

    Raises
    ------
    InputError
        For no holes, or a mark that stands twice.
    """

    holes: tuple[Hole, ...]

    def __post_init__(self) -> None:
        if not isinstance(self.holes, tuple) or not all(isinstance(h, Hole) for h in self.holes):
            raise InputError(f"holes: got {self.holes!r}; a tuple of Hole(...) is due")
        if not self.holes:
            raise InputError("holes: none; give at least one Hole(...)")
        marks = [hole.mark for hole in self.holes]
        for mark in marks:
            if marks.count(mark) > 1:
                raise InputError(f"holes: the mark {mark!r} stands twice; give each its own")

    @classmethod
    def lines(
        cls,
        per_line: int,
        at: Sequence[Length],
        end_distance: Length,
        pitch: Length | None = None,
        stagger: Sequence[Length] = (),
        *,
        element: str = "",
        first: int = 1,
    ) -> Pattern:
        """Lines of holes along the force, marked from `first` line by line.

        Parameters
        ----------
        per_line : int
            Holes in each line.
        at : sequence of length
            Where each line lies across the element.
        end_distance : length
            Member's end to the first hole of an unstaggered line.
        pitch : length
            Hole to hole along a line; due for more than one.
        stagger : sequence of length
            How far each line stands back from the first, one entry a line; none for all in step.
        """
        number = count("per_line", per_line, at_least=1)
        start = count("first", first, at_least=0)
        if not isinstance(at, list | tuple) or not at:
            raise InputError(f"at: got {at!r}; the place of each line, for example ['55 mm']")
        if not isinstance(stagger, list | tuple):
            raise InputError(f"stagger: got {stagger!r}; one length a line, or () for none")
        if number > 1 and pitch is None:
            raise InputError("pitch: missing; two or more holes a line need it, as '70 mm'")
        if stagger and len(stagger) != len(at):
            raise InputError(f"stagger: got {len(stagger)} entries; {len(at)}, one a line, are due")
        first_x = _by(end_distance, "end_distance")
        step = 0.0
        if pitch is not None:
            step = float(door("pitch", pitch, LENGTH, above=0.0, example="70 mm").internal)
        backs = [_by(back, "stagger") for back in stagger] or [0.0] * len(at)
        holes: list[Hole] = []
        for line, back in zip(at, backs, strict=True):
            for i in range(number):
                x = quantity(first_x + back + i * step, LENGTH)
                holes.append(Hole(str(start + len(holes)), x, line, element))
        return cls(tuple(holes))

    def __add__(self, other: Pattern) -> Pattern:
        if not isinstance(other, Pattern):
            raise InputError(f"holes: got {other!r}; a Pattern is added to a Pattern")
        return Pattern(self.holes + other.holes)

    # What was drilled ---------------------------------------------------------------------

    def moved(self, mark: str, *, dx: Length = "0 mm", dy: Length = "0 mm") -> Pattern:
        """A hole drilled off its place by (dx, dy)."""
        hole = self._hole(mark)
        x = quantity(in_mm(hole.x) + _by(dx, "dx"), LENGTH)
        y = quantity(in_mm(hole.y) + _by(dy, "dy"), LENGTH)
        return self._with(replace(hole, x=x, y=y))

    def without_bolt(self, mark: str) -> Pattern:
        """The hole is there, its bolt is not."""
        return self._with(replace(self._hole(mark), bolt=False))

    def without_hole(self, mark: str) -> Pattern:
        """The hole was not drilled."""
        gone = self._hole(mark)
        return Pattern(tuple(hole for hole in self.holes if hole is not gone))

    def with_hole(self, hole: Hole) -> Pattern:
        """One hole more."""
        return Pattern((*self.holes, hole))

    def reamed(self, mark: str, diameter: Length) -> Pattern:
        """A hole opened out to a diameter of its own."""
        return self._with(replace(self._hole(mark), kind="standard", diameter=diameter))

    def end_cut(self, by: Length) -> Pattern:
        """The member's end cut shorter by a length: every hole stands so much nearer to it."""
        cut = float(door("by", by, LENGTH, at_least=0.0, example="6 mm").internal)
        return Pattern(tuple(replace(h, x=quantity(in_mm(h.x) - cut, LENGTH)) for h in self.holes))

    def _hole(self, mark: str) -> Hole:
        for hole in self.holes:
            if hole.mark == mark:
                return hole
        marks = [hole.mark for hole in self.holes]
        raise InputError(
            f"mark: no hole {mark!r}; the pattern has {', '.join(marks)}."
            + did_you_mean(str(mark), marks)
        )

    def _with(self, changed: Hole) -> Pattern:
        return Pattern(tuple(changed if h.mark == changed.mark else h for h in self.holes))
