"""A pinned end: an eye in a flat, between two fork plates on a pin."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from tensionlib.errors import InputError
from tensionlib.joints.ends import Gusset
from tensionlib.joints.stated import Length, Stated, in_mm
from tensionlib.quantities import LENGTH, STRESS, Quantity, door

Stress = Quantity | str


@dataclass(frozen=True)
class Pinned(Stated):
    """A flat with an eye in its end, on a pin between two fork plates.

    Parameters
    ----------
    pin : length
        Diameter of the pin.
    pin_f_y : stress
        Yield stress of the pin, as certified.
    hole : length
        Diameter of the hole.
    edge_beyond : length
        Centre of the hole to the end of the eye, along the member.
    plate : Gusset
        One fork plate: its thickness, steel and width across the force at the pin, which is due.
    plate_edge_beyond : length
        Centre of the hole to the end of a fork plate.
    eye_width : length, optional
        Width of the eye across the force at the hole; the flat's width unless given.
    gap : length
        Between the eye and each fork plate.
    rotates : bool
        Whether the pin turns in service.
    """

    pin: Length
    pin_f_y: Stress
    hole: Length
    edge_beyond: Length
    plate: Gusset
    plate_edge_beyond: Length
    eye_width: Length | None = None
    gap: Length = "2 mm"
    rotates: bool = False
    to: str = "plate"
    k_te: float | None = None
    k_te_reason: str = ""
    kind: ClassVar[str] = "pinned"

    def __post_init__(self) -> None:
        if self.to != "plate":
            raise InputError(f"to: got {self.to!r}; a pinned end is the eye of a flat, 'plate'")
        for name, example in (
            ("pin", "40 mm"),
            ("hole", "41 mm"),
            ("edge_beyond", "80 mm"),
            ("plate_edge_beyond", "80 mm"),
        ):
            self._length(name, example=example, due=True)
        self._length("eye_width", example="160 mm")
        self._length("gap", at_least=0.0, example="2 mm", due=True)
        strength = door("pin_f_y", self.pin_f_y, STRESS, above=0.0, example="350 MPa")
        object.__setattr__(self, "pin_f_y", strength)
        if not isinstance(self.plate, Gusset):
            raise InputError(
                f"plate: got {self.plate!r}; a Gusset is due, for example"
                " Gusset('16 mm', 'AS/NZS 3678 250', '160 mm')"
            )
        if self.plate.width is None:
            raise InputError("plate.width: missing; a fork plate needs it, for example '160 mm'")
        if not isinstance(self.rotates, bool):
            raise InputError(f"rotates: got {self.rotates!r}; True or False is due")
        pin, hole = in_mm(self.pin), in_mm(self.hole)
        if hole < pin:
            raise InputError(f"hole: got {hole:g} mm; no less than the pin's {pin:g} mm is due")
        for name, length in (
            ("edge_beyond", in_mm(self.edge_beyond)),
            ("plate_edge_beyond", in_mm(self.plate_edge_beyond)),
            ("plate.width", in_mm(self.plate.width) / 2),
        ):
            if length <= hole / 2:
                raise InputError(f"{name}: the hole of {hole:g} mm would cut the edge")
        self._factor()

    def eye(self, width: Length) -> float:
        """Width of the eye in mm, `width` being the flat's.

        Raises
        ------
        InputError
            For an eye narrower than the flat or than its hole.
        """
        flat = door("width", width, LENGTH).internal
        eye = flat if self.eye_width is None else in_mm(self.eye_width)
        if eye < flat:
            raise InputError(f"eye_width: got {eye:g} mm; no less than the flat's {flat:g} mm")
        if eye <= in_mm(self.hole):
            raise InputError(
                f"hole: got {in_mm(self.hole):g} mm; less than the eye's width of {eye:g} mm"
            )
        return float(eye)
