"""NZS 3404:Part 1:1997: tension members and their end connections."""

from __future__ import annotations

from tensionlib.standards.interface import Standard
from tensionlib.standards.nzs3404.notation import NZS
from tensionlib.standards.nzs3404.walk import design, hole_clearance

STANDARD = Standard(key="nzs3404", notation=NZS, design=design, hole_clearance=hole_clearance)
