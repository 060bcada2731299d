"""Units to write quantities with: ``285*kN``, ``4.6*m``, ``0.75*inch``.

Each is shown in the fixed unit of its role, whichever it was written in: ``4.6*m`` is 4600 mm.
"""

from __future__ import annotations

from tensionlib.quantities import Quantity, parse

N: Quantity = parse("1 N")
kN: Quantity = parse("1 kN")
MN: Quantity = parse("1 MN")
lbf: Quantity = parse("1 lbf")
kip: Quantity = parse("1 kip")
mm: Quantity = parse("1 mm")
cm: Quantity = parse("1 cm")
m: Quantity = parse("1 m")
inch: Quantity = parse("1 in")
ft: Quantity = parse("1 ft")
Pa: Quantity = parse("1 Pa")
kPa: Quantity = parse("1 kPa")
MPa: Quantity = parse("1 MPa")
GPa: Quantity = parse("1 GPa")
psi: Quantity = parse("1 psi")
ksi: Quantity = parse("1 ksi")
psf: Quantity = parse("1 psf")
ksf: Quantity = parse("1 ksf")
kg: Quantity = parse("1 kg")
tonne: Quantity = parse("1 t")
lb: Quantity = parse("1 lb")
deg: Quantity = parse("1 deg")
rad: Quantity = parse("1 rad")
kNm: Quantity = parse("1 kN·m")

__all__ = [
    "MN",
    "GPa",
    "MPa",
    "N",
    "Pa",
    "cm",
    "deg",
    "ft",
    "inch",
    "kN",
    "kNm",
    "kPa",
    "kg",
    "kip",
    "ksf",
    "ksi",
    "lb",
    "lbf",
    "m",
    "mm",
    "psf",
    "psi",
    "rad",
    "tonne",
]
