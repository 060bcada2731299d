"""Bolts: sizes, property classes and bolting categories.

Areas of M12 to M36 and the strengths of the classes are those of published capacity tables, from
memory. The core area A_c is the area at the thread's minor diameter: the ISO metric thread gives
d3 = d − 1.22687 P for the root of the external thread, and π d3²/4 meets the listed areas of M12,
M16, M20, M24, M30 and M36 within 0.1 % (the minor diameter of the internal thread, d − 1.08253 P,
is 4 to 5 % above them); the areas of M22 and M27, not remembered with certainty, are computed from
it.
"""

from __future__ import annotations

import math
import re
from dataclasses import dataclass

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean

SOURCE = "AS 1110, AS/NZS 1252, from memory"
COMPUTED = SOURCE + "; core area computed from the ISO metric thread"


@dataclass(frozen=True)
class Size:
    """A bolt size: mm and mm². `across_flats` is of the heavier head where two are made."""

    name: str
    d_f: float
    pitch: float
    A_s: float
    A_c: float
    A_o: float
    across_flats: float
    N_ti: float | None
    source: str = SOURCE


def core_area(d_f: float, pitch: float) -> float:
    """Area at the root of an external ISO metric thread, mm²; lengths in mm."""
    return math.pi / 4 * (d_f - 1.22687 * pitch) ** 2


# N_ti: minimum tension at installation of class 8.8 in N, where remembered (M16 and up).
SIZES: dict[str, Size] = {
    size.name: size
    for size in (
        Size("M12", 12.0, 1.75, 84.3, 76.2, 113.0, 19.0, None),
        Size("M16", 16.0, 2.0, 157.0, 144.0, 201.0, 27.0, 95e3),
        Size("M20", 20.0, 2.5, 245.0, 225.0, 314.0, 32.0, 145e3),
        Size("M22", 22.0, 2.5, 303.0, core_area(22.0, 2.5), 380.0, 36.0, None, COMPUTED),
        Size("M24", 24.0, 3.0, 353.0, 324.0, 452.0, 41.0, 210e3),
        Size("M27", 27.0, 3.0, 459.0, core_area(27.0, 3.0), 573.0, 46.0, None, COMPUTED),
        Size("M30", 30.0, 3.5, 561.0, 519.0, 707.0, 50.0, 335e3),
        Size("M36", 36.0, 4.0, 817.0, 759.0, 1018.0, 60.0, 490e3),
    )
}
# Class 10.9 is of AS 4100:2020, its strengths from memory, fairly sure.
CLASSES = {"4.6": (400.0, 240.0), "8.8": (830.0, 660.0), "10.9": (1040.0, 940.0)}
CATEGORIES = {
    "S": "snug tight",
    "TB": "tensioned, bearing",
    "TF": "tensioned, friction",
}


@dataclass(frozen=True)
class Bolt:
    """A bolt: diameters in mm, areas in mm², strengths in MPa, installed tension in N."""

    size: str
    grade: str
    category: str
    d_f: float
    A_s: float
    A_c: float
    A_o: float
    f_uf: float
    f_yf: float
    across_flats: float
    N_ti: float | None
    source: str = SOURCE

    @property
    def designation(self) -> str:
        return f"{self.size} {self.grade}/{self.category}"


_NAME = re.compile(r"(M\d+)\s*[- ]?\s*(\d+\.\d+)?\s*(?:/\s*([A-Za-z]+))?", re.IGNORECASE)


def _names() -> list[str]:
    return [
        f"{size} {grade}/{category}"
        for size in SIZES
        for grade in CLASSES
        for category in (CATEGORIES if grade != "4.6" else ("S",))
    ]


def bolt(name: str) -> Bolt:
    """A bolt by size, class and category: "M20 8.8/S", "M24 8.8/TB", "M16 4.6/S".

    Without a category it is snug tight (S).

    Raises
    ------
    InputError, DataNotFoundError
        For a size, class or category not on offer.
    """
    if not isinstance(name, str):
        raise InputError(f"bolts: got {name!r}; name them, for example 'M20 8.8/S'")
    found = _NAME.fullmatch(name.strip())
    if found is None or found[2] is None:
        raise InputError(
            f"bolts: got {name!r}; size, class and category are due, for example 'M20 8.8/S'."
            + did_you_mean(name, _names())
        )
    size, grade, category = found[1].upper(), found[2], (found[3] or "S").upper()
    if size not in SIZES or grade not in CLASSES or category not in CATEGORIES:
        raise DataNotFoundError(
            f"bolts: {name!r} is not on offer; sizes are {', '.join(SIZES)}, classes"
            f" {', '.join(CLASSES)}, categories {', '.join(CATEGORIES)}."
            + did_you_mean(f"{size} {grade}/{category}", _names())
        )
    if grade == "4.6" and category != "S":
        raise InputError(f"bolts: got {name!r}; class 4.6 is snug tight only, '{size} 4.6/S'")
    s = SIZES[size]
    f_uf, f_yf = CLASSES[grade]
    return Bolt(
        size,
        grade,
        category,
        s.d_f,
        s.A_s,
        s.A_c,
        s.A_o,
        f_uf,
        f_yf,
        s.across_flats,
        s.N_ti if grade == "8.8" else None,
        s.source,
    )
