"""A threaded rod in a bought fork or clevis on a lug of the gusset, with a turnbuckle or sleeve."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from tensionlib.errors import InputError
from tensionlib.joints.ends import Gusset
from tensionlib.joints.stated import Length, Stated, choice, in_mm
from tensionlib.quantities import FORCE, Quantity, door
from tensionlib.steel.bolts import SIZES

COUPLINGS = ("none", "turnbuckle", "sleeve")


@dataclass(frozen=True)
class Threaded(Stated):
    """The threaded end of a round bar.

    Parameters
    ----------
    thread : str
        Size of the thread, "M24".
    fork_capacity : force
        Design capacity of the bought fork with its pin, and of the turnbuckle where there is one:
        the least of what their makers certify.
    certified_by : str
        Who says so, printed with it.
    pin, hole : length
        Diameter of the fork's pin and of its hole in the gusset.
    plate : Gusset
        The lug: its thickness, steel and width across the force at the pin, which is due.
    plate_edge_beyond : length
        Centre of the hole to the edge of the lug, along the member.
    coupling : str
        In the length of the rod: "none", "turnbuckle" or "sleeve".
    sleeve_diameter : length
        Outside diameter of a sleeve; due for one.
    sleeve_steel : str
        Its grade; due for one.
    engagement : length
        Length of thread in the sleeve at each side; due for one.
    bracing : bool
        Whether the rod braces: its connection is then designed for the rod's own capacity where
        it is tightened by a turnbuckle.
    """

    thread: str
    fork_capacity: Quantity | str
    certified_by: str
    pin: Length
    hole: Length
    plate: Gusset
    plate_edge_beyond: Length
    coupling: str = "none"
    sleeve_diameter: Length | None = None
    sleeve_steel: str = ""
    engagement: Length | None = None
    bracing: bool = True
    to: str = "rod"
    k_te: float | None = None
    k_te_reason: str = ""
    kind: ClassVar[str] = "rod"

    def __post_init__(self) -> None:
        choice("thread", self.thread, tuple(SIZES))
        choice("coupling", self.coupling, COUPLINGS)
        choice("to", self.to, ("rod",))
        rated = door("fork_capacity", self.fork_capacity, FORCE, above=0.0, example="120 kN")
        object.__setattr__(self, "fork_capacity", rated)
        if not isinstance(self.certified_by, str) or not self.certified_by.strip():
            raise InputError("certified_by: missing; say who certifies the fork's capacity")
        for name, example in (("pin", "24 mm"), ("hole", "26 mm"), ("plate_edge_beyond", "50 mm")):
            self._length(name, example=example, due=True)
        if not isinstance(self.plate, Gusset):
            raise InputError(
                f"plate: got {self.plate!r}; a Gusset is due, for example"
                " Gusset('16 mm', 'AS/NZS 3678 250', '100 mm')"
            )
        if self.plate.width is None:
            raise InputError("plate.width: missing; the lug needs it, for example '100 mm'")
        if in_mm(self.hole) < in_mm(self.pin):
            raise InputError(
                f"hole: got {in_mm(self.hole):g} mm; no less than the pin's"
                f" {in_mm(self.pin):g} mm is due"
            )
        sleeve = self.coupling == "sleeve"
        self._length("sleeve_diameter", example="50 mm", due=sleeve)
        self._length("engagement", example="30 mm", due=sleeve)
        if not isinstance(self.sleeve_steel, str) or sleeve != bool(self.sleeve_steel):
            raise InputError(
                "sleeve_steel: name the grade of a sleeve, for example 'AS/NZS 3679.1 300'"
                if sleeve
                else "sleeve_steel: given without a sleeve; it needs coupling='sleeve'"
            )
        if sleeve and in_mm(self.sleeve_diameter) <= SIZES[self.thread].d_f:
            raise InputError("sleeve_diameter: it is to be greater than the thread's")
        if not isinstance(self.bracing, bool):
            raise InputError(f"bracing: got {self.bracing!r}; True or False is due")
