"""Runs of fillet weld that share a force in their plane, by statics.

Axes and signs as in `bolt_group`: x along the force towards the body of the part, y across it,
moments positive from x towards y. Stresses stand on the throat, per unit of the whole force
(1/mm²). Lengths in mm. Returns round a corner at the end of a run do not count in its length.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from tensionlib.errors import InputError
from tensionlib.joints.bolt_group import first_of_greatest

_ROUNDING = 1e-6  # mm: what rounding does to a run as wide as the leg


@dataclass(frozen=True, slots=True)
class Run:
    """A straight run of fillet weld with legs of equal size, from point 1 to point 2.

    Raises
    ------
    InputError
        For a point that is not finite, a run of no length, or a leg that is not positive.
    """

    mark: str
    x_1: float
    y_1: float
    x_2: float
    y_2: float
    leg: float

    def __post_init__(self) -> None:
        points = (self.x_1, self.y_1, self.x_2, self.y_2)
        if not all(map(math.isfinite, points)):
            raise InputError(f"run {self.mark!r}: points {points}; finite numbers of mm are due")
        if self.length == 0.0:
            raise InputError(
                f"run {self.mark!r}: it starts and ends at ({self.x_1:g}, {self.y_1:g}) mm;"
                " two points apart are due"
            )
        if not 0.0 < self.leg < math.inf:
            raise InputError(f"run {self.mark!r}: leg {self.leg!r} mm; more than 0 mm is due")

    @property
    def length(self) -> float:
        """Length, mm."""
        return math.hypot(self.x_2 - self.x_1, self.y_2 - self.y_1)

    @property
    def throat(self) -> float:
        """Design throat between equal legs at a right angle, leg/√2, mm."""
        return self.leg / math.sqrt(2.0)

    @property
    def angle(self) -> float:
        """Between the run and the force, rad: 0 along it, π/2 across it."""
        return math.atan2(abs(self.y_2 - self.y_1), abs(self.x_2 - self.x_1))


@dataclass(frozen=True)
class FilletGroup:
    """Runs and their throats as lines: `length` (mm) and `area` (mm²) of all throats, centroid
    `x_c`, `y_c` weighted by throat area (mm), polar second moment `I_p` about it (mm⁴)."""

    runs: tuple[Run, ...]
    length: float
    area: float
    x_c: float
    y_c: float
    I_p: float


@dataclass(frozen=True, slots=True)
class Peak:
    """Where the throat stress is greatest: x and y from the group's centroid (mm), stress along
    and across the force per unit force (1/mm²), throat of the run (mm)."""

    mark: str
    x: float
    y: float
    along: float
    across: float
    throat: float

    @property
    def size(self) -> float:
        """Resultant throat stress per unit force, 1/mm²."""
        return math.hypot(self.along, self.across)

    @property
    def per_length(self) -> float:
        """Force per length of the run there, per unit force, 1/mm."""
        return self.size * self.throat


def properties(runs: Sequence[Run]) -> FilletGroup:
    """Length, area, centroid and polar second moment of runs. Statics.

    Raises
    ------
    InputError
        For no runs, or a mark that stands twice.
    """
    if not runs:
        raise InputError("runs: none; give at least one run of weld")
    marks: set[str] = set()
    for run in runs:
        if run.mark in marks:
            raise InputError(f"runs: the mark {run.mark!r} stands twice; give each run its own")
        marks.add(run.mark)
    areas = [run.throat * run.length for run in runs]
    middles = [((run.x_1 + run.x_2) / 2, (run.y_1 + run.y_2) / 2) for run in runs]
    area = math.fsum(areas)
    x_c = math.fsum(a * x for a, (x, _) in zip(areas, middles, strict=True)) / area
    y_c = math.fsum(a * y for a, (_, y) in zip(areas, middles, strict=True)) / area
    I_p = math.fsum(
        a * (run.length**2 / 12 + (x - x_c) ** 2 + (y - y_c) ** 2)
        for run, a, (x, y) in zip(runs, areas, middles, strict=True)
    )
    return FilletGroup(tuple(runs), math.fsum(run.length for run in runs), area, x_c, y_c, I_p)


def stress_at(group: FilletGroup, line_y: float | None, x: float, y: float) -> tuple[float, float]:
    """Throat stress along and across at (x, y) from the centroid, for a unit force along +x on the
    line y = `line_y` in the part's axes, or through the centroid with None, 1/mm².

    Elastic vectors: along = 1/area - e·y/I_p and across = e·x/I_p, e the centroid's y less the
    line's. Statics.

    Raises
    ------
    InputError
        For a line that is no finite number.
    """
    if line_y is not None and not math.isfinite(line_y):
        raise InputError(f"line_y: got {line_y!r}; a finite number of mm, or None, is due")
    turn = 0.0 if line_y is None else (group.y_c - line_y) / group.I_p
    return 1.0 / group.area - turn * y, turn * x


def elastic_stress(group: FilletGroup, line_y: float | None) -> Peak:
    """The greatest throat stress of a unit force along +x on the line y = `line_y`, or through the
    centroid with None; of equals, the first as the runs came.

    A stress that varies in line along a straight run is greatest at one of its ends. Statics.

    Raises
    ------
    InputError
        As `stress_at`.
    """
    ends = []
    for run in group.runs:
        for x, y in (
            (run.x_1 - group.x_c, run.y_1 - group.y_c),
            (run.x_2 - group.x_c, run.y_2 - group.y_c),
        ):
            ends.append(Peak(run.mark, x, y, *stress_at(group, line_y, x, y), run.throat))
    return first_of_greatest(ends, lambda end: end.size)


def balanced_runs(
    lever_low: float,
    lever_high: float,
    total: float,
    transverse: float = 0.0,
    transverse_at: float | None = None,
) -> tuple[float, float]:
    """Lengths of the runs along the low and the high edge that put the weld's centroid on the
    member's, in mm. Moments about the edges; statics.

    All runs have one leg size. `lever_low` and `lever_high` go from the member's centroid to the
    low edge (an angle's heel) and the high edge (its toe); `total` is the length of all runs with
    the transverse one. `transverse` is the length of a run across the end, centred
    `transverse_at` from the low edge, half way unless given. Returns do not count.

    Raises
    ------
    InputError
        For a length out of its range, a transverse run that does not fit between the edges, or a
        total too short to balance it, with the least that does.
    """
    for name, lever in (("lever_low", lever_low), ("lever_high", lever_high), ("total", total)):
        if not 0.0 < lever < math.inf:
            raise InputError(f"{name}: got {lever!r} mm; more than 0 mm is due")
    width = lever_low + lever_high
    at = width / 2 if transverse_at is None else transverse_at
    if not 0.0 <= transverse <= width + _ROUNDING:
        raise InputError(f"transverse: got {transverse!r} mm; 0 to {width:g} mm is due")
    if not transverse / 2 - _ROUNDING <= at <= width - transverse / 2 + _ROUNDING:
        raise InputError(
            f"transverse_at: got {at!r} mm; {transverse / 2:g} to {width - transverse / 2:g} mm is"
            f" due, that a run of {transverse:g} mm fits between the edges"
        )
    least = max(transverse * at / lever_low, transverse * (width - at) / lever_high)
    if total < least:
        raise InputError(
            f"total: got {total:g} mm; at least {math.ceil(least * 1e3) / 1e3:.3f} mm is due, that"
            f" runs along the edges balance the transverse run of {transverse:g} mm"
        )
    low = (total * lever_high - transverse * (width - at)) / width
    high = (total * lever_low - transverse * at) / width
    return max(low, 0.0), max(high, 0.0)
