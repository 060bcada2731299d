"""What a standard offers to the layers above."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from tensionlib.calculation.inputs import Inputs
from tensionlib.calculation.sheet import Entry
from tensionlib.calculation.symbols import Notation, Source
from tensionlib.calculation.working import Working
from tensionlib.joints.blocks import Form

Walk = Callable[[Working, Inputs, tuple[Inputs, ...], Entry], None]


def _no_blocks(f_y: float, f_u: float, uniform: bool) -> tuple[Form, ...]:
    return ()


@dataclass(frozen=True)
class Standard:
    """A standard: its key (the folder's name), its notation, and its walk for a tension member.

    `hole_size` gives width and length in mm of a hole for a bolt diameter and a kind of hole.
    `block_forms` gives what block shear makes of f_y and f_u in MPa, the tension on the block
    uniform or not, nothing unless given: the search looks for the block with the least capacity
    by these forms.
    The notation holds at least the symbol N_star, the design tension force. `edition` is what a
    user writes behind the name to ask for this one ("1997"); `others` are the other editions on
    offer.
    """

    key: str
    notation: Notation
    design: Walk
    hole_size: Callable[[float, str], tuple[float, float]]
    block_forms: Callable[[float, float, bool], tuple[Form, ...]] = _no_blocks
    edition: str = ""
    others: tuple[Standard, ...] = ()

    @property
    def source(self) -> Source:
        return self.notation.source
