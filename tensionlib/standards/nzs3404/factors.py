"""Capacity factors, NZS 3404:Part 1:1997 Table 3.3(1) (read in a printed page of the table)."""

from __future__ import annotations

CLAUSE = "Table 3.3(1)"

MEMBER_IN_TENSION = 0.90
BOLT = 0.80
PLY_IN_BEARING = 0.90
CONNECTION_COMPONENT = 0.90
FILLET_WELD = {"SP": 0.80, "GP": 0.60}
