"""A welded end whose runs are stated one by one: any direction, each its own leg size."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from tensionlib.errors import InputError
from tensionlib.joints.ends import BOLTED_TO, Gusset, check_plate
from tensionlib.joints.fillet_group import Run, balanced_runs
from tensionlib.joints.stated import QUALITIES, Length, Stated, choice, in_mm
from tensionlib.quantities import LENGTH, Quantity, door, quantity
from tensionlib.steel import Section
from tensionlib.steel.outline import Properties
from tensionlib.steel.shapes import outline


@dataclass(frozen=True)
class FilletRun:
    """One straight run of fillet weld.

    Parameters
    ----------
    mark : str
    x_1, y_1, x_2, y_2 : length
        From one end to the other: x along the member from its end into its body, y across the
        element from its heel or first edge.
    leg_size : length
    """

    mark: str
    x_1: Length
    y_1: Length
    x_2: Length
    y_2: Length
    leg_size: Length

    def __post_init__(self) -> None:
        for name in ("x_1", "y_1", "x_2", "y_2", "leg_size"):
            value = getattr(self, name)
            taken = door(f"run {self.mark}: {name}", value, LENGTH, at_least=0.0, example="120 mm")
            object.__setattr__(self, name, taken)
        self.as_run()

    def as_run(self) -> Run:
        """The run in mm. Raises InputError for one of no length or no leg."""
        places = (self.x_1, self.y_1, self.x_2, self.y_2, self.leg_size)
        return Run(self.mark, *map(in_mm, places))


@dataclass(frozen=True)
class WeldedRuns(Stated):
    """A welded end of any runs of fillet weld on one element, shared by elastic vectors.

    Parameters
    ----------
    to : str
        The element on the gusset: a leg, web, flange or plate.
    runs : tuple of FilletRun
    plate : Gusset
    quality : str
        "SP" or "GP".
    metal : str
    k_te, k_te_reason
        As `Welded`.
    """

    to: str
    runs: tuple[FilletRun, ...]
    plate: Gusset
    quality: str = "SP"
    metal: str = "E48XX"
    k_te: float | None = None
    k_te_reason: str = ""
    kind: ClassVar[str] = "welded runs"

    def __post_init__(self) -> None:
        choice("to", self.to, tuple(name for name in BOLTED_TO if name != "both flanges"))
        choice("quality", self.quality, QUALITIES)
        if not isinstance(self.metal, str):
            raise InputError(f"metal: got {self.metal!r}; name it, for example 'E48XX'")
        check_plate(self.plate)
        if (
            not isinstance(self.runs, tuple)
            or not self.runs
            or not all(isinstance(run, FilletRun) for run in self.runs)
        ):
            raise InputError(f"runs: got {self.runs!r}; a tuple of FilletRun(...) is due")
        marks = [run.mark for run in self.runs]
        if len(set(marks)) < len(marks):
            raise InputError(f"runs: the marks {', '.join(marks)} repeat; give each its own")
        self._factor()


def member_line(section: Section, element: str) -> float:
    """Where the member's centroid lies across an element, from its heel or first edge, mm.

    Raises
    ------
    InputError
        For a section whose centroid is not known.
    """
    shape = section.shape.removeprefix("double ")
    at: float | None
    if shape == "angle":
        # A pair's own centroid lies in the gap; each component's counts across the leg.
        one = Properties.of(outline("angle", section.dims).moments())
        at = one.x_c if element in ("short leg", "other leg") else one.y_c
    elif shape == "tee" and element == "web":
        at = section.y_c
    else:
        name = element.removesuffix(" 1").removesuffix(" 2")
        at = section.x_c if (shape, name) == ("channel", "flange") else section.leg(name) / 2
    if at is None:
        raise InputError(
            f"section: the centroid of {section.designation} is not stated, so the moment of its"
            " force about the joint is not known"
        )
    return at


def balanced_lengths(
    section: Section, to: str, total: Length, transverse: Length | None = None
) -> tuple[Quantity, Quantity]:
    """Lengths of the runs along the heel and the other edge that balance the weld: its centroid
    lies on the member's, so the joint carries no moment in its plane. Statics.

    Parameters
    ----------
    section : Section
    to : str
        The element on the gusset.
    total : length
        Of all runs together, the one across the end with them.
    transverse : length, optional
        A run across the end, centred on the element's width.

    Raises
    ------
    InputError
        Where no two lengths balance: with the least total that does.
    """
    low = member_line(section, to)
    high = section.leg(to) - low
    whole = door("total", total, LENGTH, above=0.0, example="300 mm").internal
    across = 0.0
    if transverse is not None:
        across = door("transverse", transverse, LENGTH, above=0.0, example="90 mm").internal
    first, second = balanced_runs(low, high, whole, across)
    return quantity(first, LENGTH), quantity(second, LENGTH)
