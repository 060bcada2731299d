"""Comparison with a figure as somebody printed it: half a unit of its last figure."""

from __future__ import annotations

from decimal import Decimal


def agrees(value: float, printed: str, *, figures: int | None = None, units: float = 0.5) -> bool:
    """Whether `value` rounds to `printed`; a tie may have gone either way.

    The last figure is the last one behind a decimal point, or else the last that is not a zero:
    "20100" is known to 50. `figures` says how many count where that is not so, and `units` widens
    or narrows the half unit, with the reason beside the call.
    """
    number = Decimal(printed)
    exponent = (number if "." in printed else number.normalize()).as_tuple().exponent
    assert isinstance(exponent, int)
    if figures is not None:
        exponent = number.adjusted() - figures + 1
    return abs(value - float(printed)) <= units * 10.0**exponent * (1.0 + 1e-9)
