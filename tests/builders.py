"""Members and ends the tests start from; each test states what it changes."""

from __future__ import annotations

from typing import Any

import tensionlib as tl

SECTION_STEEL = "AS/NZS 3679.1 300"
PLATE_STEEL = "AS/NZS 3678 250"
TUBE_STEEL = "AS/NZS 1163 C350"


def gusset(**changes: Any) -> tl.Gusset:
    return tl.Gusset(**{"thickness": "12 mm", "steel": PLATE_STEEL} | changes)


def bolted(**changes: Any) -> tl.Bolted:
    """Three M20 8.8/S in one line of an angle's long leg; pass None to take a field away."""
    usual = {
        "to": "long leg",
        "bolts": "M20 8.8/S",
        "threads": "in shear plane",
        "per_line": 3,
        "pitch": "70 mm",
        "gauge": "60 mm",
        "end_distance": "40 mm",
        "plate": gusset(),
    }
    return tl.Bolted(**usual | changes)


def two_lines(**changes: Any) -> tl.Bolted:
    """Two lines about the middle of an element that has one: web, flange, flat."""
    return bolted(**{"lines": 2, "line_spacing": "70 mm", "gauge": None} | changes)


def welded(**changes: Any) -> tl.Welded:
    """6 mm fillets 150 mm long on both sides of an angle's long leg."""
    usual = {"to": "long leg", "leg_size": "6 mm", "plate": gusset(), "length_1": "150 mm"}
    return tl.Welded(**usual | changes)


def member(section: Any = "150x90x10 UA", end: Any = None, **changes: Any) -> tl.Member:
    usual = {
        "mark": "T1",
        "section": section,
        "steel": SECTION_STEEL,
        "length": "4 m",
        "end": bolted() if end is None else end,
    }
    return tl.Member(**usual | changes)


def tube(section: str = "114.3x4.8 CHS", **changes: Any) -> tl.Member:
    """A tube slotted over its gusset and welded by four runs; `changes` are of the end."""
    end = welded(**{"to": "slot", "slot_clearance": "2 mm"} | changes)
    return member(section, end, steel=TUBE_STEEL)
