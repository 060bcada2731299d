"""Strengths of a steel by thickness, as tables a walk reads."""

from __future__ import annotations

from functools import cache

from tensionlib.calculation.tables import Band, ThresholdTable
from tensionlib.steel import Grade


@cache
def strength_table(steel: Grade, strength: str, of: str) -> ThresholdTable:
    bands = tuple(
        Band(row.limit, row.closed, row.f_y if strength == "f_y" else row.f_u) for row in steel.rows
    )
    return ThresholdTable(f"{strength} by the thickness of {of}", steel.known, {steel.name: bands})


def strength_tables(
    steel: Grade, f_y: str, f_u: str, of: str
) -> dict[str, tuple[ThresholdTable, str]]:
    return {
        f_y: (strength_table(steel, "f_y", of), steel.name),
        f_u: (strength_table(steel, "f_u", of), steel.name),
    }


def refuse_beyond(tables: dict[str, tuple[ThresholdTable, str]], thickness: float) -> None:
    """Refuse a thickness in mm that the grade's tables do not reach. Raises InputError."""
    for table, row in tables.values():
        table.band(row, thickness)
