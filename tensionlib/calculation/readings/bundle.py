"""What a calculation hands to a notebook."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

from tensionlib.calculation.readings import html, text

if TYPE_CHECKING:
    from tensionlib.calculation.result import Calculation

MIMETYPE = "application/vnd.tensionlib+json"


def of(calc: Calculation) -> dict[str, Any]:
    """HTML for the screen, LaTeX and text for other readers, and the record itself."""
    record = calc.record()
    return {
        "text/plain": text.of(record),
        "text/html": html.of(record),
        "text/latex": calc.latex(),
        MIMETYPE: record,
    }
