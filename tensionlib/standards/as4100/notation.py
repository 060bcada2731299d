"""Notation and numbering of AS 4100, editions 1998 (with amendments) and 2020.

The edition of 2020 dropped the clause of definitions from section 9, so that what followed moved
up by one: 9.3 Design of bolts became 9.2, and so on to 9.9. The shift of 9.3, 9.6 and 9.7 is from
memory, fairly sure; that of 9.4, 9.5, 9.8 and 9.9 follows from it. Section 7, 9.1 and section 14
keep their numbers as far as remembered.
"""

from __future__ import annotations

import re

from tensionlib.calculation.symbols import Notation, Source
from tensionlib.standards.common_as_nzs.symbols import SYMBOLS

_SECTION_9 = re.compile(r"\b9\.([3-9])(?=\b)")


def renumbered(clause: str) -> str:
    """The clause of 1998 as the edition of 2020 numbers it."""
    return _SECTION_9.sub(lambda found: f"9.{int(found[1]) - 1}", clause)


AS_2020 = Notation(
    Source("AS 4100:2020 (with amendments; check the edition in force)", "AS 4100", "from memory"),
    SYMBOLS,
    cite=renumbered,
)
AS_1998 = Notation(
    Source("AS 4100:1998 (with amendments to 2012; superseded by 2020)", "AS 4100", "from memory"),
    SYMBOLS,
)
