"""Room for washer, nut and wrench at a bolt. Lengths are floats in mm.

No standard sets these: what is needed is geometry, and the rules are common practice with no
source. Socket diameters are trade data from memory, rounded up; those of the wrench at hand are to
be checked against them.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

from tensionlib.errors import DataNotFoundError, InputError
from tensionlib.steel.bolt_lengths import hardware
from tensionlib.steel.bolts import SIZES

CLEARANCE = 2.0  # mm between a socket and what stands beside it; common practice, no source

# Outside diameter of an impact socket for the heavier head; trade data from memory, rounded up.
_SOCKETS = {
    "M12": 32.0,
    "M16": 45.0,
    "M20": 50.0,
    "M22": 55.0,
    "M24": 62.0,
    "M27": 68.0,
    "M30": 73.0,
    "M36": 86.0,
}
_PRACTICE = "common practice, no source"
_SOCKET_NOTE = "socket diameter from memory, check the wrench; " + _PRACTICE


@dataclass(frozen=True)
class Room:
    """One check of room: what is needed and what there is, in mm.

    `advice` marks what is good workmanship, and not a nut that cannot be fitted.
    """

    what: str
    needs: float
    has: float
    note: str
    advice: bool = False

    @property
    def ok(self) -> bool:
        """Whether there is as much room as is needed."""
        return self.has >= self.needs - 1e-9


def washer_outside(size: str) -> float:
    """Outside diameter of the larger washer, mm; DataNotFoundError for a size without a row."""
    return hardware(size).washer.outside


def across_corners(size: str) -> float:
    """Across the corners of the heavier head or nut, mm: across flats times 2/√3 (geometry).

    Raises DataNotFoundError for a size without a row.
    """
    hardware(size)
    return SIZES[size].across_flats * 2.0 / math.sqrt(3.0)


def socket_outside(size: str) -> float:
    """Outside diameter of an impact socket, mm, trade data from memory.

    Raises DataNotFoundError for a size without a row, naming those with one.
    """
    if size not in _SOCKETS:
        raise DataNotFoundError(
            f"size: no socket is held for {size!r}; sizes with one are {', '.join(_SOCKETS)}"
        )
    return _SOCKETS[size]


def washer_at_root(gauge: float, t_other: float, r_root: float, size: str) -> Room:
    """Whether the washer sits on the flat, clear of the root radius.

    `gauge` from the heel (or a flange's outer face) to the line, `t_other` the thickness of the
    leg or flange there.
    """
    _sound(gauge=gauge, t_other=t_other, r_root=r_root)
    return Room(
        "washer clear of the root radius",
        washer_outside(size) / 2,
        gauge - t_other - r_root,
        "half the washer on the flat; " + _PRACTICE,
    )


def wrench_at_leg(gauge: float, t_other: float, size: str) -> Room:
    """Whether a socket goes over the nut beside the other leg; arguments as `washer_at_root`."""
    _sound(gauge=gauge, t_other=t_other)
    return Room(
        "socket clear of the other leg",
        socket_outside(size) / 2 + CLEARANCE,
        gauge - t_other,
        _SOCKET_NOTE,
    )


def wrench_at_bolt(spacing: float, size: str, what: str = "pitch") -> Room:
    """Whether a socket goes over one nut beside the next, `spacing` from centre to centre."""
    _sound(spacing=spacing)
    return Room(
        f"socket clear of the next nut ({what})",
        socket_outside(size) / 2 + across_corners(size) / 2 + CLEARANCE,
        spacing,
        _SOCKET_NOTE,
    )


def washer_at_toe(width: float, gauge: float, r_toe: float, size: str) -> Room:
    """Whether the washer stays within the flat at the toe of a leg `width` wide, as advice."""
    _sound(width=width, gauge=gauge, r_toe=r_toe)
    return Room(
        "washer within the toe",
        washer_outside(size) / 2,
        width - gauge - r_toe,
        "advice, a washer may overhang a toe; " + _PRACTICE,
        advice=True,
    )


def rooms(
    size: str,
    *,
    width: float,
    gauge: float,
    t_other: float,
    r_root: float,
    r_toe: float,
    pitch: float | None = None,
    line_spacing: float | None = None,
    stagger: float = 0.0,
) -> list[Room]:
    """Every check of room for one leg with one or two lines of bolts.

    Parameters
    ----------
    size : str
        "M20".
    width, t_other, r_root, r_toe : float
        Width of the leg, thickness of the other leg, root radius and toe radius.
    gauge : float
        Heel to the first line, the one nearer to the heel.
    pitch : float, optional
        Bolt to bolt along a line; without it the line has one bolt.
    line_spacing : float, optional
        Line to line across the force; without it there is one line.
    stagger : float
        How far the second line stands back along the force.

    Raises
    ------
    InputError
        For a dimension that is no length, or a stagger without a second line.
    DataNotFoundError
        For a size without a row.
    """
    out = [
        washer_at_root(gauge, t_other, r_root, size),
        wrench_at_leg(gauge, t_other, size),
    ]
    if pitch is not None:
        out.append(wrench_at_bolt(pitch, size))
    _sound(stagger=stagger)
    outer = gauge
    if line_spacing is not None:
        _sound(line_spacing=line_spacing)
        outer = gauge + line_spacing
        # Along a line of several bolts the nearest one may be any of them.
        along = stagger if pitch is None else abs(stagger - pitch * round(stagger / pitch))
        out.append(wrench_at_bolt(math.hypot(along, line_spacing), size, "line to line"))
    elif stagger > 0.0:
        raise InputError(f"stagger: got {stagger:g} mm for one line of bolts; give line_spacing")
    out.append(washer_at_toe(width, outer, r_toe, size))
    return out


def _sound(**lengths: float) -> None:
    """Refuse what is no length; 0 is accepted only where there may be nothing."""
    for name, value in lengths.items():
        may_be_none = name in ("r_root", "r_toe", "stagger", "t_other")
        if not math.isfinite(value) or value < 0.0 or (value == 0.0 and not may_be_none):
            least = "0 or more" if may_be_none else "more than 0"
            raise InputError(f"{name}: got {value!r}; a length in mm, {least}, is due")
