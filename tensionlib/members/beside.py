"""What a member carries beside its tension: loads across it, offsets of the force, earthquake."""

from __future__ import annotations

from dataclasses import dataclass

from tensionlib.errors import InputError
from tensionlib.joints.stated import Length, Stated, choice
from tensionlib.quantities import WEIGHT_PER_LENGTH, Quantity, door, factor

Load = Quantity | str

CATEGORIES = ("1", "2", "3", "4")


@dataclass(frozen=True)
class Across(Stated):
    """Loads across a tie or hanger and offsets of its force, for the strength limit state.

    The axes are those of the section's outline: a moment about x bends it up and down as it is
    drawn (an angle stands with its long leg up, its short leg along x).

    Parameters
    ----------
    span : length, optional
        Between supports across the load, along the member; its length unless given. The loads are
        those across the member for each of its length; for an inclined member the whole
        self-weight is taken as across it, on the safe side.
    self_weight : bool
        Whether the member's own weight bends it about x.
    weight_factor : number
        Load factor on the self-weight; 1.2 unless given (AS/NZS 1170.0 4.2.2, from memory).
    load : force per length, optional
        Further design load that bends about x, such as "0.4 kN/m".
    side_load : force per length, optional
        Design load that bends about y.
    offset_x, offset_y : length, optional
        How far the tension acts off the member's line, bending about x or about y along its whole
        length; for what the correction factor k_t does not cover.
    sag_limit, stretch_limit : length, optional
        What is allowed in service; printed without a check unless given.
    """

    span: Length | None = None
    self_weight: bool = True
    weight_factor: float = 1.2
    load: Load | None = None
    side_load: Load | None = None
    offset_x: Length | None = None
    offset_y: Length | None = None
    sag_limit: Length | None = None
    stretch_limit: Length | None = None

    def __post_init__(self) -> None:
        self._length("span", example="4 m")
        for name in ("offset_x", "offset_y"):
            self._length(name, at_least=0.0, example="12 mm")
        for name in ("sag_limit", "stretch_limit"):
            self._length(name, example="10 mm")
        for name in ("load", "side_load"):
            value = getattr(self, name)
            if value is not None:
                taken = door(name, value, WEIGHT_PER_LENGTH, at_least=0.0, example="0.4 kN/m")
                object.__setattr__(self, name, taken)
        if not isinstance(self.self_weight, bool):
            raise InputError(f"self_weight: got {self.self_weight!r}; True or False is due")
        weight = factor("weight_factor", self.weight_factor, above=0.0, at_most=2.0)
        object.__setattr__(self, "weight_factor", weight)


@dataclass(frozen=True)
class Overstrength(Stated):
    """A brace that yields in an earthquake: its connection is designed for more than its force.

    Parameters
    ----------
    category : str
        Category of the member, "1" to "4".
    factor : number, optional
        Overstrength factor of the member; the library's remembered value of its category unless
        given, which is unsure and printed as such.
    bearing_factor : number, optional
        The factor C_1 of ply bearing under earthquake, which the library does not know.
    """

    category: str
    factor: float | None = None
    bearing_factor: float | None = None

    def __post_init__(self) -> None:
        choice("category", self.category, CATEGORIES)
        for name in ("factor", "bearing_factor"):
            value = getattr(self, name)
            if value is not None:
                object.__setattr__(self, name, factor(name, value, above=0.0, at_most=5.0))
        if self.factor is not None and self.factor < 1.0:
            raise InputError(f"factor: got {self.factor:g}; an overstrength factor is 1.0 or more")
