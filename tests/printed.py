"""Comparison with a figure as somebody printed it: half a unit of its last figure."""

from __future__ import annotations

from decimal import Decimal


def half_unit(printed: str, figures: int | None = None) -> float:
    """Half a unit of the last figure of `printed`.

    `figures` says how many figures count where zeros end a whole number: "20100" to three
    figures is known to 50.
    """
    number = Decimal(printed)
    last = number.as_tuple().exponent
    assert isinstance(last, int)
    if figures is not None:
        last = max(last, number.adjusted() - figures + 1)
    return float(Decimal(5).scaleb(last - 1))


def agrees(value: float, printed: str, figures: int | None = None) -> bool:
    """Whether `value` rounds to `printed`; a tie may have gone either way."""
    return abs(value - float(printed)) <= half_unit(printed, figures) * (1.0 + 1e-9)
