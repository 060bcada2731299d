"""A table that is read by a threshold, such as the yield stress by thickness."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING, Any

from tensionlib.errors import InputError

if TYPE_CHECKING:
    import numpy as np
    import numpy.typing as npt


@dataclass(frozen=True)
class Band:
    """Up to `limit` (internal units) the table gives `value`; `closed` counts the limit in."""

    limit: float
    closed: bool
    value: float

    def holds(self, by: float) -> bool:
        return by <= self.limit if self.closed else by < self.limit


@dataclass(frozen=True)
class ThresholdTable:
    """Named rows of bands in rising order of their limits: rows are grades, bands thicknesses.

    A value beyond the last band is refused: the table says nothing there.
    """

    name: str
    source: str
    rows: dict[str, tuple[Band, ...]]

    @cached_property
    def names(self) -> tuple[str, ...]:
        return tuple(self.rows)

    def band(self, row: str, by: float) -> int:
        """Index of the band of `row` in which `by` falls.

        Raises
        ------
        InputError
            When `by` lies beyond the row's last band.
        """
        for index, band in enumerate(self.rows[row]):
            if band.holds(by):
                return index
        last = self.rows[row][-1]
        raise InputError(f"{self.name}, {row}: got {by:g} mm; the table ends at {last.limit:g} mm")

    def read(self, row: str, by: Any) -> Any:
        """The value of `row` at `by`, a float or an array of any shape.

        A float beyond the last band is refused; in an array it gives NaN, which passes no check.
        """
        if isinstance(by, float):
            return self.rows[row][self.band(row, by)].value
        return self._read_array(row, by)

    def _read_array(self, row: str, by: npt.NDArray[np.float64]) -> npt.NDArray[np.float64]:
        import numpy as np

        bands = self.rows[row]
        out = np.full(by.shape, np.nan)
        for band in reversed(bands):
            inside = by <= band.limit if band.closed else by < band.limit
            out[inside] = band.value
        return out
