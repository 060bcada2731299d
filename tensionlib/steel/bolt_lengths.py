"""Bolts as bought: the length to order, and whether the thread reaches a shear plane.

Lengths are floats in mm. Every table of dimensions here is from memory of the product standard
named beside it; what was not remembered with certainty is said in `Hardware.unsure`, and every
length picked carries the remark.

A bolt and its nut are not yet chosen by maker when a joint is designed, so each check takes the
value of the listed products that is worse for it: the highest nut and the thickest washer for
the end that must stick out, the thinnest washer for the thread the nut needs. Lengths are
nominal: the tolerance on a bolt's length and on its plies is not taken off.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.quantities import count
from tensionlib.steel.bolts import SIZES

# Bolts of ISO 4014 and AS 1110.1 come in the lengths of ISO 888, from memory; 75 mm is not one of
# them, but common among structural bolts (common practice, no source).
LENGTHS = (
    *(float(length) for length in range(25, 81, 5)),
    *(float(length) for length in range(90, 161, 10)),
    *(float(length) for length in range(180, 361, 20)),
)
_OFF_SERIES = 75.0

# ISO 4014 lists a bolt's grip up to the thread as l - b at most and its full shank as 5 pitches
# less at least (from memory): the run-out of the thread and the tolerance on its length. A shear
# plane there is counted as meeting threads.
TRANSITION_PITCHES = 5.0
# Clear threads beyond the nut and beneath it after tightening: one each, from memory of AS 4100's
# rules for fabrication and erection, whose clause number is not remembered.
CLEAR_PITCHES = 1.0
_MOST_WASHERS = 2  # under the head, and under the nut; common practice, no source
_MOST_EXTRA = 100  # mm; how much thicker a ply is tried for a way out
_FALL_BACK = "take threads in the shear plane"
_HAIR = 1e-9  # mm; sums of thicknesses that meet a limit to the last bit are on it


@dataclass(frozen=True)
class Washer:
    """A round washer: thickness at least and at most, outside diameter. mm."""

    least: float
    most: float
    outside: float


@dataclass(frozen=True)
class Hardware:
    """What is bought in one size. mm, from memory of the standards beside the tables.

    Parameters
    ----------
    size : str
    nut : float
        Height of the highest nut.
    washer : Washer
        What both kinds of washer span: thinnest, thickest, largest outside.
    shortest, shortest_shank, longest : float
        Lengths: the shortest screw threaded to its head, the shortest and the longest bolt.
    unsure : str
        What was not remembered with certainty.
    """

    size: str
    nut: float
    washer: Washer
    shortest: float
    shortest_shank: float
    longest: float
    unsure: str


# Greatest heights of nuts: ISO 4032 (regular), ISO 4034 (coarse, as goes with class 4.6) and
# AS/NZS 1252 (structural), from memory; no structural nut of M12 is remembered, and M22 and M27
# are those of the metric series of structural nuts.
_NUTS: dict[str, tuple[float, ...]] = {
    "M12": (10.8, 12.2),
    "M16": (14.8, 15.9, 17.1),
    "M20": (18.0, 19.0, 20.7),
    "M22": (19.4, 20.2, 23.6),
    "M24": (21.5, 22.3, 24.2),
    "M27": (23.8, 24.7, 27.6),
    "M30": (25.6, 26.4, 30.7),
    "M36": (31.0, 31.9, 36.6),
}
# Flat round hardened washers of AS/NZS 1252, from memory and unsure in every row: the metric
# series with the larger outside diameters is taken.
_STRUCTURAL_WASHERS = {
    "M12": Washer(3.1, 4.6, 27.0),
    "M16": Washer(3.1, 4.6, 34.0),
    "M20": Washer(3.1, 4.6, 42.0),
    "M22": Washer(3.4, 4.6, 44.0),
    "M24": Washer(3.4, 4.6, 50.0),
    "M27": Washer(3.4, 4.6, 56.0),
    "M30": Washer(3.4, 4.6, 60.0),
    "M36": Washer(3.4, 4.6, 72.0),
}
# Plain washers of ISO 7089, from memory, with its tolerance on the thickness.
_PLAIN_WASHERS = {
    "M12": Washer(2.3, 2.7, 24.0),
    "M16": Washer(2.7, 3.3, 30.0),
    "M20": Washer(2.7, 3.3, 37.0),
    "M22": Washer(2.7, 3.3, 39.0),
    "M24": Washer(3.7, 4.3, 44.0),
    "M27": Washer(3.7, 4.3, 50.0),
    "M30": Washer(3.7, 4.3, 56.0),
    "M36": Washer(4.4, 5.6, 66.0),
}
# Shortest screw of ISO 4017, shortest and longest bolt of ISO 4014, from memory.
_RANGES = {
    "M12": (25.0, 50.0, 120.0),
    "M16": (30.0, 65.0, 160.0),
    "M20": (40.0, 80.0, 200.0),
    "M22": (45.0, 90.0, 220.0),
    "M24": (50.0, 90.0, 240.0),
    "M27": (55.0, 100.0, 260.0),
    "M30": (60.0, 110.0, 300.0),
    "M36": (70.0, 140.0, 360.0),
}
_CONFIRM = " not remembered with certainty; confirm with the supplier"


def _row(size: str) -> Hardware:
    a, b = _STRUCTURAL_WASHERS[size], _PLAIN_WASHERS[size]
    washer = Washer(min(a.least, b.least), max(a.most, b.most), max(a.outside, b.outside))
    what = "structural nut and washer" if size in ("M12", "M22", "M27") else "structural washer"
    return Hardware(size, max(_NUTS[size]), washer, *_RANGES[size], f"{size} {what}" + _CONFIRM)


HARDWARE: dict[str, Hardware] = {size: _row(size) for size in _NUTS}


@dataclass(frozen=True)
class BoltLength:
    """A length to order and how it sits in the joint. mm, measured from under the head.

    Parameters
    ----------
    size : str
    grip : float
        Thickness of all plies together, without washers.
    washers_head, washers_nut : int
        Washers under the head and under the nut.
    nominal : float
        The length to order.
    thread : float
        Nominal thread length; all of the bolt where the rule asks for more than there is.
    shank : float
        Full shank there is at least, 0 where the thread or its run-out reaches the head.
    projection : float
        What sticks out of the highest nut on the thickest washers.
    planes_at : tuple of float
        Where the shear planes lie, in the order of the plies as stated.
    planes_in_threads : tuple of bool
        Whether each of them meets threads or their run-out.
    notes : tuple of str
        What to know before ordering.
    """

    size: str
    grip: float
    washers_head: int
    washers_nut: int
    nominal: float
    thread: float
    shank: float
    projection: float
    planes_at: tuple[float, ...]
    planes_in_threads: tuple[bool, ...]
    notes: tuple[str, ...]

    @property
    def designation(self) -> str:
        """Size and length, "M20 × 70"."""
        return f"{self.size} × {self.nominal:g}"

    @property
    def clear_of_threads(self) -> bool:
        """Whether every shear plane lies in the shank."""
        return not any(self.planes_in_threads)


@dataclass(frozen=True)
class Verdict:
    """Whether an assumption can be built, and why or what to change."""

    ok: bool
    why: str


def hardware(size: str) -> Hardware:
    """Nuts, washers and lengths made in a size, "M20".

    Raises
    ------
    DataNotFoundError
        For a size without a row, naming those with one.
    """
    if not isinstance(size, str) or size not in HARDWARE:
        raise DataNotFoundError(
            f"size: no nuts, washers and lengths are held for {size!r}; sizes with them are"
            f" {', '.join(HARDWARE)}."
            + (did_you_mean(size, HARDWARE) if isinstance(size, str) else "")
        )
    return HARDWARE[size]


def thread_length(d_f: float, length: float) -> float:
    """Nominal thread length of a hexagon bolt, mm: diameter and nominal length in mm.

    2d + 6 up to 125 mm long, 2d + 12 up to 200 mm, 2d + 25 above (ISO 4014, AS 1110.1, from
    memory). Structural bolts of AS/NZS 1252 are taken by the same rule, which is not remembered
    with certainty for them. A bolt shorter than that is threaded over all its length.
    """
    if length <= 125.0:
        ruled = 2.0 * d_f + 6.0
    elif length <= 200.0:
        ruled = 2.0 * d_f + 12.0
    else:
        ruled = 2.0 * d_f + 25.0
    return min(ruled, length)


def shank_length(size: str, length: float) -> float:
    """Full shank a bolt of a nominal length has at least, under its head; both in mm.

    The length less its thread and less 5 pitches for run-out and tolerance (ISO 4014, from
    memory). Raises DataNotFoundError for a size without a row.
    """
    hardware(size)
    d_f, pitch = SIZES[size].d_f, SIZES[size].pitch
    return max(0.0, length - thread_length(d_f, length) - TRANSITION_PITCHES * pitch)


def pick_length(
    size: str,
    plies: Sequence[float],
    *,
    washers_head: int = 0,
    washers_nut: int = 1,
    head_on_first: bool = True,
) -> BoltLength:
    """The shortest length on sale whose end sticks out of the nut as it must.

    Parameters
    ----------
    size : str
        "M20".
    plies : sequence of float
        Thickness of each ply through which the bolt goes, in mm, packing included; a shear plane
        lies between every two.
    washers_head, washers_nut : int
        0 to 2 each.
    head_on_first : bool
        Whether the head lies on the first ply and the nut on the last, or the other way round.

    Raises
    ------
    DataNotFoundError
        For a size without a row, or a joint longer than the longest bolt.
    InputError
        For plies or washers outside what is accepted, or where the length due would leave the
        nut without thread.
    """
    found = _fitting(size, plies, washers_head, washers_nut, head_on_first)
    first = next(found, None)
    if first is not None:
        return first
    row, due = hardware(size), _least_length(size, math.fsum(plies), washers_head + washers_nut)
    if due > row.longest + _HAIR:
        raise DataNotFoundError(
            f"plies: {math.fsum(plies):g} mm in all need a {size} bolt of {due:g} mm; the longest"
            f" held is {row.longest:g} mm (ISO 4014, from memory), longer ones are made to order"
        )
    raise InputError(
        f"plies: {math.fsum(plies):g} mm in all with {washers_head + washers_nut} washers: a {size}"
        f" bolt long enough to stick out of its nut ({due:g} mm) comes with too short a thread for"
        " the thinnest washers; change the number of washers or a ply"
    )


def longer_length(
    size: str,
    plies: Sequence[float],
    *,
    washers_head: int = 0,
    washers_nut: int = 1,
    head_on_first: bool = True,
) -> BoltLength | None:
    """The bolt of any length on sale with every shear plane in its shank, or None.

    Lengths are tried with the washers stated and then with more under the nut, up to two; the
    fewest washers win, then the shortest bolt. Arguments as `pick_length`.

    Raises
    ------
    DataNotFoundError, InputError
        For a size without a row; for plies or washers outside what is accepted.
    """
    washers_nut = _washers("washers_nut", washers_nut)
    for nut_side in range(washers_nut, _MOST_WASHERS + 1):
        for bolt in _fitting(size, plies, washers_head, nut_side, head_on_first):
            if bolt.clear_of_threads:
                return bolt
    return None


def buildable(
    threads: str,
    size: str,
    plies: Sequence[float],
    *,
    washers_head: int = 0,
    washers_nut: int = 1,
    head_on_first: bool = True,
) -> Verdict:
    """Whether an assumption on the threads holds for the bolt `pick_length` orders.

    `threads` is "in shear plane", which is safe for any bolt, or "out of shear plane", which
    holds only where no shear plane meets threads. Where it does not, the verdict says what would
    make it hold. Other arguments and errors as `pick_length`; InputError for other words.
    """
    if threads not in ("in shear plane", "out of shear plane"):
        raise InputError(
            f"threads: got {threads!r}; 'in shear plane' or 'out of shear plane' is due"
        )
    chosen = pick_length(
        size,
        plies,
        washers_head=washers_head,
        washers_nut=washers_nut,
        head_on_first=head_on_first,
    )
    if threads == "in shear plane":
        return Verdict(True, f"threads in the shear planes is safe for {chosen.designation}")
    shank = f"{chosen.designation} has {chosen.shank:.4g} mm of full shank under its head"
    if chosen.clear_of_threads:
        remark = "".join(f"; {note}" for note in chosen.notes)
        return Verdict(True, f"{shank}, and every shear plane lies in it{remark}")
    met = [
        f"{at:.4g} mm"
        for at, meets in zip(chosen.planes_at, chosen.planes_in_threads, strict=True)
        if meets
    ]
    lead = f"{shank}, and meets threads in the shear plane at {' and at '.join(met)}"
    ways = _ways_out(size, plies, washers_head, washers_nut, head_on_first)
    return Verdict(False, f"{lead}: " + (" or ".join(ways) if ways else _FALL_BACK))


def _ways_out(
    size: str, plies: Sequence[float], washers_head: int, washers_nut: int, head_on_first: bool
) -> list[str]:
    """What would bring every shear plane into the shank, the cheapest first."""
    ways = []
    turned = next(_fitting(size, plies, washers_head, washers_nut, not head_on_first), None)
    if turned is not None and turned.clear_of_threads:
        ways.append("turn the bolt round")
    longer = longer_length(
        size,
        plies,
        washers_head=washers_head,
        washers_nut=washers_nut,
        head_on_first=head_on_first,
    )
    if longer is not None:
        washers = "1 washer" if longer.washers_nut == 1 else f"{longer.washers_nut} washers"
        ways.append(f"order {longer.designation} with {washers} under the nut")
    outer = len(plies) - 1 if head_on_first else 0
    for extra in range(1, _MOST_EXTRA + 1):
        thicker = [t + extra * (i == outer) for i, t in enumerate(plies)]
        bolt = next(_fitting(size, thicker, washers_head, washers_nut, head_on_first), None)
        if bolt is not None and bolt.clear_of_threads:
            ways.append(
                f"make the ply next to the nut at least {thicker[outer]:.4g} mm thick"
                f" ({bolt.designation})"
            )
            break
    return [*ways, _FALL_BACK] if ways else ways


def _washers(argument: str, value: int) -> int:
    return count(argument, value, at_least=0, at_most=_MOST_WASHERS)


def _least_length(size: str, grip: float, washers: int) -> float:
    """Length that reaches through grip, thickest washers and highest nut to the clear thread."""
    row = hardware(size)
    return grip + washers * row.washer.most + row.nut + CLEAR_PITCHES * SIZES[size].pitch


def _fitting(
    size: str, plies: Sequence[float], washers_head: int, washers_nut: int, head_on_first: bool
) -> Iterator[BoltLength]:
    """Every length on sale that sticks out of the nut and leaves it thread, shortest first."""
    row = hardware(size)
    d_f, pitch = SIZES[size].d_f, SIZES[size].pitch
    washers_head = _washers("washers_head", washers_head)
    washers_nut = _washers("washers_nut", washers_nut)
    if len(plies) < 2:
        raise InputError(f"plies: got {len(plies)}; a joint has two or more")
    for t in plies:
        if not (math.isfinite(t) and t > 0.0):
            raise InputError(f"plies: got {t!r}; each is a thickness above 0, in mm")
    washers, grip = washers_head + washers_nut, math.fsum(plies)
    due = _least_length(size, grip, washers)
    # The thickest washers under the head bring the planes nearest to the thread.
    order = list(plies) if head_on_first else list(plies)[::-1]
    head = washers_head * row.washer.most
    planes = [head + math.fsum(order[:i]) for i in range(1, len(order))]
    planes_at = tuple(planes if head_on_first else planes[::-1])
    nut_face = grip + washers * row.washer.least
    for length in LENGTHS:
        if not row.shortest <= length <= row.longest or length < due - _HAIR:
            continue
        thread = thread_length(d_f, length)
        if length - thread > nut_face - CLEAR_PITCHES * pitch + _HAIR:
            continue
        shank = shank_length(size, length)
        yield BoltLength(
            size,
            grip,
            washers_head,
            washers_nut,
            length,
            thread,
            shank,
            length - (due - CLEAR_PITCHES * pitch),
            planes_at,
            tuple(at > shank + _HAIR for at in planes_at),
            _notes(row, length, shank),
        )


def _notes(row: Hardware, length: float, shank: float) -> tuple[str, ...]:
    """What to know before ordering a length."""
    notes = []
    if length < row.shortest_shank and shank > 0.0:
        notes.append(
            f"ISO 4014 bolts of {row.size} start at {row.shortest_shank:g} mm (from memory); order"
            " a structural bolt, not a screw threaded to its head (ISO 4017)"
        )
    if length == _OFF_SERIES:
        notes.append("75 mm is not in the series of ISO 888; confirm it with the supplier")
    return (*notes, row.unsure)
