"""A pinned end: an eye in a flat, between two fork plates on a pin."""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

from tensionlib.errors import InputError
from tensionlib.joints.ends import Gusset
from tensionlib.joints.stated import Length, Stated, in_mm
from tensionlib.quantities import LENGTH, STRESS, Quantity, door

Stress = Quantity | str


def plain_plate(what: str, plate: object, example: str, *, hung: bool) -> None:
    """Refuse a plate at a pin unless it is a Gusset with its width and no more than is checked.

    Parameters
    ----------
    what : str
        How messages call it: "a fork plate", "the lug".
    example : str
        What a message offers.
    hung : bool
        Whether a hanger is accepted.

    Raises
    ------
    InputError
        For another kind of plate, one without its width, or one with an outline, a compression or
        (unless `hung`) a hanger, none of which would be looked at.
    """
    if type(plate) is not Gusset:
        raise InputError(f"plate: got {plate!r}; a Gusset is due, for example {example}")
    if plate.width is None:
        raise InputError(f"plate.width: missing; {what} needs it, for example '160 mm'")
    refused = ("shape", "compression") if hung else ("shape", "compression", "hanger")
    for name in refused:
        if getattr(plate, name) is not None:
            raise InputError(
                f"plate.{name}: given for {what}; the checks at a pin do not look at it, so it is"
                " to be left out"
            )


def holds_hole(name: str, length: float, taken: float) -> None:
    """Refuse a length, mm, of which the hole takes `taken` and leaves nothing."""
    if length <= taken:
        raise InputError(
            f"{name}: got {length:g} mm; the hole would cut the edge, more than {taken:g} mm is due"
        )


@dataclass(frozen=True)
class Pinned(Stated):
    """A flat with an eye in its end, on a pin between two fork plates.

    The eye is as thick as the flat; plates welded to its faces are not covered. Its end is cut
    square, or rounded about the hole.

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
        Both are alike. An outline, a compression or a hanger is refused.
    plate_edge_beyond : length
        Centre of the hole to the end of a fork plate.
    eye_width : length, optional
        Width of the eye across the force at the hole; the flat's width unless given.
    gap : length
        Between the eye and each fork plate.
    rotates : bool
        Whether the pin turns in service.
    k_te : number, optional
        Correction factor of the eye's net section stated by the engineer, in place of 1.0; printed
        with `k_te_reason`.

    Raises
    ------
    UnitError, InputError
        Naming the field, what came and what is accepted.
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
        example = "Gusset('16 mm', 'AS/NZS 3678 250', '160 mm')"
        plain_plate("a fork plate", self.plate, example, hung=False)
        if not isinstance(self.rotates, bool):
            raise InputError(f"rotates: got {self.rotates!r}; True or False is due")
        pin, hole = in_mm(self.pin), in_mm(self.hole)
        if hole < pin:
            raise InputError(f"hole: got {hole:g} mm; no less than the pin's {pin:g} mm is due")
        holds_hole("edge_beyond", in_mm(self.edge_beyond), hole / 2)
        holds_hole("plate_edge_beyond", in_mm(self.plate_edge_beyond), hole / 2)
        holds_hole("plate.width", in_mm(self.plate.width), hole)
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
            raise InputError(
                f"eye_width: got {eye:g} mm; no less than the flat's {flat:g} mm is due"
            )
        if eye <= in_mm(self.hole):
            raise InputError(
                f"hole: got {in_mm(self.hole):g} mm; less than the eye's width of {eye:g} mm is due"
            )
        return float(eye)
