"""A gusset that is the stem of a tee hung from its support by bolts in tension."""

from __future__ import annotations

from dataclasses import dataclass

from tensionlib.errors import InputError
from tensionlib.joints.stated import THREADS, Length, Stated, choice
from tensionlib.quantities import ANGLE, Quantity, count, door, factor, quantity


@dataclass(frozen=True)
class Hanger(Stated):
    """The flange of a tee, or an end plate, bolted to the support.

    Parameters
    ----------
    bolts : str
        Size, class and category, for example "M20 8.8/TB".
    number : int
        Bolts in tension, an even number: half on each side of the stem.
    gauge : length
        Bolt line to bolt line across the stem.
    tributary : length
        Length of flange along the stem that each bolt bends: the pitch, and no more than the gauge.
    thickness : length
        Of the flange.
    steel : str
        Grade of the flange.
    threads : str
        For the shear: "in shear plane" or "out of shear plane".
    angle : angle, optional
        Between the force and the bolts' axis; 0 unless given. The rest is shear.
    prying : number
        Allowance on the bolts' tension for prying, 0.3 unless given (common practice, no source).
    """

    bolts: str
    number: int
    gauge: Length
    tributary: Length
    thickness: Length
    steel: str
    threads: str = "in shear plane"
    angle: Quantity | str | None = None
    prying: float = 0.3

    def __post_init__(self) -> None:
        for name in ("bolts", "steel"):
            if not isinstance(getattr(self, name), str):
                raise InputError(f"{name}: got {getattr(self, name)!r}; a name is due")
        number = count("number", self.number, at_least=2)
        if number % 2:
            raise InputError(f"number: got {number}; an even number of bolts is due")
        object.__setattr__(self, "number", number)
        for name, example in (("gauge", "120 mm"), ("tributary", "80 mm"), ("thickness", "20 mm")):
            self._length(name, example=example, due=True)
        choice("threads", self.threads, THREADS)
        taken = quantity(0.0, ANGLE) if self.angle is None else self.angle
        turned = door("angle", taken, ANGLE, at_least=0.0, example="30 deg")
        if turned.internal > 1.5:
            raise InputError("angle: 85 degrees from the bolts' axis at most; else they only shear")
        object.__setattr__(self, "angle", turned)
        object.__setattr__(self, "prying", factor("prying", self.prying, at_least=0.0, at_most=2.0))
