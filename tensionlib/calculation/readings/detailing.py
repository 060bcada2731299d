"""The detailing report: every limit on distances, welds, bolts as bought and room, in one table."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from tensionlib.calculation.readings import html, text

_PRACTICE = "common practice"


def rows_of(record: dict[str, Any]) -> dict[str, Any]:
    """The record's detailing limits and advice alone; where no clause says so, the practice."""
    kept = [check for check in record["checks"] if check["kind"] in ("detailing", "advice")]
    return {
        "checks": [
            check | {"clause": _PRACTICE if check["clause"] == "practice" else check["clause"]}
            for check in kept
        ]
    }


@dataclass(frozen=True)
class DetailingReport:
    """What a detailer goes by. Shown in a notebook, it reads as a table."""

    record: dict[str, Any]

    @property
    def passes(self) -> bool:
        """Whether every limit holds; advice does not count."""
        return all(check["verdict"] != "fail" for check in self.record["checks"])

    def __str__(self) -> str:
        return "\n".join(text.checks(self.record, indent=0))

    __repr__ = __str__

    def _repr_html_(self) -> str:
        return html.table_of_checks(self.record)
