"""Notation of NZS 3404:Part 1:1997: what it shares with AS 4100, and its own symbols."""

from __future__ import annotations

from tensionlib.calculation.symbols import Notation, Source, Symbol
from tensionlib.quantities import FACTOR, FORCE
from tensionlib.standards.common_as_nzs.symbols import SYMBOLS

SOURCE = Source(
    "NZS 3404:Part 1:1997 (with amendments; check the edition in force)",
    "NZS 3404",
    "from memory; Tables 3.3(1) and 3.3(2) read in a printed page",
)

NZS = Notation(
    SOURCE,
    [
        *SYMBOLS,
        Symbol("k_te", "k_{te}", FACTOR, "correction factor for the distribution of forces"),
        Symbol("C_1", "C_{1}", FACTOR, "ply bearing factor"),
        Symbol("phi_oms", r"\phi_{oms}", FACTOR, "overstrength factor of the member", "φ_oms"),
        Symbol("N_os", "N_{os}", FORCE, "overstrength of the brace"),
    ],
)
