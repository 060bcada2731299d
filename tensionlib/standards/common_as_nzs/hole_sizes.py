"""Sizes of holes for bolts, AS 4100 and NZS 3404 14.3.5.2, from memory, sure of the values."""

from __future__ import annotations

from tensionlib.calculation.tables import Band, ThresholdTable

STANDARD = "standard hole"
CLEARANCES = ThresholdTable(
    "clearance of a standard hole",
    "14.3.5.2, from memory",
    {STANDARD: (Band(24.0, True, 2.0), Band(float("inf"), True, 3.0))},
)


def hole_size(d_f: float, kind: str) -> tuple[float, float]:
    """Width and length of a hole for a bolt of diameter `d_f`, in mm; a round hole has both alike.

    `kind` is "standard", "oversize", "short slot" or "long slot"; the largest hole of its kind
    that the clause allows.
    """
    width: float = d_f + CLEARANCES.read(STANDARD, d_f)
    match kind:
        case "oversize":
            width = max(1.25 * d_f, d_f + 8.0)
            return width, width
        case "short slot":
            return width, max(1.33 * d_f, d_f + 10.0)
        case "long slot":
            return width, 2.5 * d_f
    return width, width
