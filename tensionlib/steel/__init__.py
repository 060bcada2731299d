"""Steel as bought: sections, grades, bolts, weld metals."""

from __future__ import annotations

from tensionlib.steel.bolts import Bolt, bolt
from tensionlib.steel.grades import Grade, grade
from tensionlib.steel.sections import (
    Section,
    by_dimensions,
    catalogue,
    double,
    find,
    section,
    stated,
)
from tensionlib.steel.weld_metals import WeldMetal, weld_metal

__all__ = [
    "Bolt",
    "Grade",
    "Section",
    "WeldMetal",
    "bolt",
    "by_dimensions",
    "catalogue",
    "double",
    "find",
    "grade",
    "section",
    "stated",
    "weld_metal",
]
