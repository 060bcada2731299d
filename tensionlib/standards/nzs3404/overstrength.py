"""Braces that yield in an earthquake, NZS 3404:Part 1:1997 section 12.

The connection of a member of category 1, 2 or 3 is designed for the member's overstrength: its
nominal capacity in gross yielding times an overstrength factor that allows for strain hardening
and for steel stronger than specified. That the rule stands in section 12 is from memory, sure; its
clause number is not cited, because memory is unsure of it. The factors are from memory, unsure:
the greater of the values remembered is taken, which is the conservative reading for a connection.
Shapes: floats or arrays (n,); units N, mm, MPa.
"""

from __future__ import annotations

from typing import Any

from tensionlib.calculation.formula import formula
from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.working import Working
from tensionlib.standards.nzs3404.notation import NZS

# By category; from memory, unsure. Category 4 is elastic: no overstrength.
FACTORS = {"1": 1.35, "2": 1.30, "3": 1.25}
CLAUSE = "section 12"
KNOWN = "from memory, sure of the rule, unsure of its number"


@formula("N_os", NZS, title="overstrength of the brace", clause=CLAUSE, known=KNOWN)
def overstrength_action(phi_oms: Any, N_ty: Any) -> Any:
    """Overstrength of a yielding brace in tension [force]. Section 12."""
    return phi_oms * N_ty


def overstrength(work: Working, member: Inputs, N_ty: Entry) -> Entry | None:
    """The lines for the brace's overstrength; None where it stays elastic."""
    category = member.choice("category")
    if category == "4":
        work.note("Member of category 4: elastic in an earthquake, no overstrength.", CLAUSE)
        return None
    if member.has("phi_oms"):
        phi = member.take(work, "phi_oms")
    else:
        phi = work.fixed(
            "phi_oms",
            FACTORS[category],
            CLAUSE,
            note=f"category {category}",
            source="from memory, unsure: compare with the table of overstrength factors",
        )
    return work.step(overstrength_action, phi, N_ty)
