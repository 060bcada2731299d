"""A threaded rod in a bought fork or clevis on a lug of the gusset, with a turnbuckle or sleeve."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from tensionlib.errors import InputError
from tensionlib.joints.ends import Gusset
from tensionlib.joints.pinned import holds_hole, plain_plate
from tensionlib.joints.stated import Length, Stated, choice, in_mm
from tensionlib.quantities import FORCE, Quantity, door
from tensionlib.steel.bolts import SIZES

COUPLINGS = ("none", "turnbuckle", "sleeve")


@dataclass(frozen=True)
class Threaded(Stated):
    """The threaded end of a round bar, in a bought fork on a lug.

    The thread is cut: the bar is no thinner than it.

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
        The lug: its thickness, steel and width across the force at the pin, which is due. An
        outline or a compression is refused.
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
    k_te : number, optional
        Correction factor of the thread's section stated by the engineer, in place of 1.0; printed
        with `k_te_reason`.

    Raises
    ------
    UnitError, InputError
        Naming the field, what came and what is accepted.
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
        example = "Gusset('16 mm', 'AS/NZS 3678 250', '100 mm')"
        plain_plate("the lug", self.plate, example, hung=True)
        pin, hole = in_mm(self.pin), in_mm(self.hole)
        if hole < pin:
            raise InputError(f"hole: got {hole:g} mm; no less than the pin's {pin:g} mm is due")
        holds_hole("plate_edge_beyond", in_mm(self.plate_edge_beyond), hole / 2)
        holds_hole("plate.width", in_mm(self.plate.width), hole)
        self._sleeve()
        if not isinstance(self.bracing, bool):
            raise InputError(f"bracing: got {self.bracing!r}; True or False is due")
        self._factor()

    def _sleeve(self) -> None:
        """The three fields of a sleeve: due for one, refused without."""
        sleeve = self.coupling == "sleeve"
        for name in ("sleeve_diameter", "engagement"):
            if not sleeve and getattr(self, name) is not None:
                raise InputError(f"{name}: given without a sleeve; it needs coupling='sleeve'")
        self._length("sleeve_diameter", example="50 mm", due=sleeve)
        self._length("engagement", example="30 mm", due=sleeve)
        if not isinstance(self.sleeve_steel, str) or sleeve != bool(self.sleeve_steel):
            raise InputError(
                "sleeve_steel: name the grade of a sleeve, for example 'AS/NZS 3679.1 300'"
                if sleeve
                else "sleeve_steel: given without a sleeve; it needs coupling='sleeve'"
            )
        if sleeve and in_mm(self.sleeve_diameter) <= SIZES[self.thread].d_f:
            raise InputError(
                f"sleeve_diameter: got {in_mm(self.sleeve_diameter):g} mm; more than the thread's"
                f" {SIZES[self.thread].d_f:g} mm is due"
            )
