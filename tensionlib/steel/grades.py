"""Steel grades: yield stress and tensile strength by thickness.

All from memory of the product standards; how sure is in `known`. A table whose last band has no
upper limit in the standard ends at infinity.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from math import inf

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean

_SECTIONS = ("angle", "channel", "I", "tee", "flat", "round", "double angle", "double channel")
_PLATES = ("plate", "flat")
_TUBES = ("CHS", "RHS")
_SURE = "from memory, sure"
_FAIRLY = "from memory, fairly sure"
_ROUNDS = "from memory, sure to 50 mm, over it the lower of the values remembered"


@dataclass(frozen=True)
class Strength:
    """Up to a thickness `limit` in mm (counted in when `closed`): f_y and f_u in MPa."""

    limit: float
    closed: bool
    f_y: float
    f_u: float


@dataclass(frozen=True)
class Grade:
    """A grade of a product standard, with its strengths in rising order of thickness.

    `rounds` holds the bands by diameter of round bars, where the standard lists them apart.
    """

    name: str
    standard: str
    known: str
    products: tuple[str, ...]
    rows: tuple[Strength, ...]
    rounds: tuple[Strength, ...] = ()

    def f_y(self, t: float) -> float:
        """Yield stress, MPa, at thickness t, mm. Raises InputError beyond the table."""
        return self._row(t).f_y

    def f_u(self, t: float) -> float:
        """Tensile strength, MPa, at thickness t, mm. Raises InputError beyond the table."""
        return self._row(t).f_u

    def _row(self, t: float) -> Strength:
        if not t > 0.0:
            raise InputError(f"thickness: got {t:g} mm; more than zero is due")
        for row in self.rows:
            if t < row.limit or (row.closed and t == row.limit):
                return row
        raise InputError(
            f"thickness: got {t:g} mm; {self.name} is listed to {self.rows[-1].limit:g} mm"
        )

    def made_as(self, shape: str) -> Grade:
        """The grade with the bands that hold for a shape: round bars have bands of their own.

        Raises
        ------
        InputError
            For a shape the product standard is not for, naming grades that suit.
        """
        self.suits(shape)
        if shape != "round" or not self.rounds:
            return self
        return replace(
            self,
            name=f"{self.name} rounds",
            known=_ROUNDS,
            products=("round",),
            rows=self.rounds,
            rounds=(),
        )

    def suits(self, shape: str, argument: str = "steel") -> None:
        """Refuse a shape the product standard is not for. A stated section takes any grade.

        Raises
        ------
        InputError
            Naming grades that suit.
        """
        if shape != "stated" and shape not in self.products:
            fitting = [g.name for g in GRADES.values() if shape in g.products]
            raise InputError(
                f"{argument}: {self.name} is not made as {shape}; for example"
                f" {', '.join(map(repr, fitting[:3]))}"
            )


def _grade(
    standard: str,
    grade: str,
    known: str,
    products: tuple[str, ...],
    *rows: tuple[float, bool, float, float],
    rounds: tuple[tuple[float, bool, float, float], ...] = (),
) -> Grade:
    return Grade(
        f"{standard} {grade}",
        standard,
        known,
        products,
        tuple(Strength(*row) for row in rows),
        tuple(Strength(*row) for row in rounds),
    )


_ALL = (
    _grade(
        "AS/NZS 3679.1",
        "300",
        _SURE,
        _SECTIONS,
        (11.0, False, 320.0, 440.0),
        (17.0, True, 300.0, 440.0),
        (inf, True, 280.0, 440.0),
        rounds=((50.0, True, 300.0, 440.0), (inf, True, 280.0, 440.0)),
    ),
    _grade(
        "AS/NZS 3679.1",
        "350",
        _FAIRLY,
        _SECTIONS,
        (11.0, False, 360.0, 480.0),
        (40.0, False, 340.0, 480.0),
        (inf, True, 330.0, 480.0),
        rounds=((50.0, True, 340.0, 480.0), (100.0, False, 330.0, 480.0)),
    ),
    _grade(
        "AS/NZS 3678",
        "250",
        _SURE + " to 50 mm, fairly sure beyond",
        _PLATES,
        (8.0, True, 280.0, 410.0),
        (12.0, True, 260.0, 410.0),
        (50.0, True, 250.0, 410.0),
        (80.0, True, 240.0, 410.0),
        (150.0, True, 230.0, 410.0),
    ),
    _grade(
        "AS/NZS 3678",
        "300",
        _FAIRLY,
        _PLATES,
        (8.0, True, 320.0, 430.0),
        (12.0, True, 310.0, 430.0),
        (20.0, True, 300.0, 430.0),
        (50.0, True, 280.0, 430.0),
        (80.0, True, 270.0, 430.0),
        (150.0, True, 260.0, 430.0),
    ),
    _grade(
        "AS/NZS 3678",
        "350",
        _SURE + " to 80 mm, fairly sure beyond",
        _PLATES,
        (12.0, True, 360.0, 450.0),
        (20.0, True, 350.0, 450.0),
        (80.0, True, 340.0, 450.0),
        (150.0, True, 330.0, 450.0),
    ),
    *(
        _grade("AS/NZS 1163", name, _SURE, _TUBES, (inf, True, f_y, f_u))
        for name, f_y, f_u in (
            ("C250", 250.0, 320.0),
            ("C350", 350.0, 430.0),
            ("C450", 450.0, 500.0),
        )
    ),
)
GRADES: dict[str, Grade] = {grade.name: grade for grade in _ALL}


def _folded(name: str) -> str:
    return "".join(c for c in name.upper() if c.isalnum() or c == ".")


_BY_NAME = {_folded(name): grade for name, grade in GRADES.items()}


def grade(name: str, argument: str = "steel") -> Grade:
    """A grade by its standard and name: "AS/NZS 3679.1 300", "AS/NZS 1163 C350".

    Raises
    ------
    InputError, DataNotFoundError
        For a grade no table holds, with the nearest names.
    """
    if not isinstance(name, str):
        raise InputError(f"{argument}: got {name!r}; name a grade, for example 'AS/NZS 3679.1 300'")
    found = _BY_NAME.get(_folded(name))
    if found is None:
        raise DataNotFoundError(
            f"{argument}: {name!r} is not a grade on offer; there are {', '.join(GRADES)}."
            + did_you_mean(name, GRADES)
        )
    return found
