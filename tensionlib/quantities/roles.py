"""What a number is: its role (length, area, force, ...) and with it its dimension.

Dimensions are counted in force, length and mass, since that is how the numbers inside the library
are kept: N, mm and kg (so a stress is N/mm2, which is MPa). Angles are in radians and, like counts
and factors, have no dimension.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache

Exponents = tuple[float, float, float]

_SUPERSCRIPTS = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")


@dataclass(frozen=True, slots=True)
class Role:
    """A named kind of number and the powers of force, length and mass in its dimension."""

    name: str
    force: float
    length: float
    mass: float
    named: bool = True

    def __hash__(self) -> int:
        # The name alone: a string keeps its hash, so looking a role up costs almost nothing.
        return hash(self.name)

    @property
    def exponents(self) -> Exponents:
        """Powers of (force, length, mass)."""
        return (self.force, self.length, self.mass)

    @property
    def dimensionless(self) -> bool:
        """True for counts, factors, codes and angles."""
        return not (self.force or self.length or self.mass)

    @property
    def is_plain_number(self) -> bool:
        """True for counts, factors and codes, which need no unit; an angle does."""
        return self.dimensionless and self.name != "angle"

    @property
    def whole(self) -> bool:
        """True where the number only counts or names a row, and prints with all its digits."""
        return self.dimensionless and self.name in ("count", "code")

    @property
    def phrase(self) -> str:
        """The name with its article, for messages: "an area"."""
        if not self.named:
            return f"a quantity in {self.name}"
        return f"{'an' if self.name[0] in 'aeiou' else 'a'} {self.name}"


LENGTH = Role("length", 0, 1, 0)
AREA = Role("area", 0, 2, 0)
VOLUME = Role("volume", 0, 3, 0)
MODULUS = Role("section modulus", 0, 3, 0)
INERTIA = Role("inertia", 0, 4, 0)
FORCE = Role("force", 1, 0, 0)
MOMENT = Role("moment", 1, 1, 0)
STRESS = Role("stress", 1, -2, 0)
ELASTIC_MODULUS = Role("elastic modulus", 1, -2, 0)
PRESSURE = Role("pressure", 1, -2, 0)
FORCE_PER_LENGTH = Role("force per length", 1, -1, 0)
WEIGHT_PER_LENGTH = Role("weight per length", 1, -1, 0)
WELD_STRENGTH = Role("weld strength", 1, -1, 0)
WEIGHT_DENSITY = Role("weight density", 1, -3, 0)
MASS = Role("mass", 0, 0, 1)
MASS_PER_LENGTH = Role("mass per length", 0, -1, 1)
DENSITY = Role("density", 0, -3, 1)
ANGLE = Role("angle", 0, 0, 0)
COUNT = Role("count", 0, 0, 0)
FACTOR = Role("factor", 0, 0, 0)
CODE = Role("code", 0, 0, 0)

NAMED_ROLES: tuple[Role, ...] = (
    LENGTH,
    AREA,
    VOLUME,
    MODULUS,
    INERTIA,
    FORCE,
    MOMENT,
    STRESS,
    ELASTIC_MODULUS,
    PRESSURE,
    FORCE_PER_LENGTH,
    WEIGHT_PER_LENGTH,
    WELD_STRENGTH,
    WEIGHT_DENSITY,
    MASS,
    MASS_PER_LENGTH,
    DENSITY,
    ANGLE,
    COUNT,
    FACTOR,
    CODE,
)

# The role a bare dimension is taken for: the first named one that has it, and of the
# dimensionless ones the factor.
_BY_EXPONENTS: dict[Exponents, Role] = {}
for _role in (FACTOR, *NAMED_ROLES):
    _BY_EXPONENTS.setdefault(_role.exponents, _role)


def role_of(exponents: Exponents) -> Role:
    """Give the role of a dimension; one without a name is called after its unit, "N·mm³"."""
    return _BY_EXPONENTS.get(exponents) or _unnamed(exponents)


@lru_cache(maxsize=1024)
def _unnamed(exponents: Exponents) -> Role:
    name = unit_text(tuple(zip(("N", "mm", "kg"), exponents, strict=True)))
    return Role(name, *exponents, named=False)


def power_text(power: float) -> str:
    """Write a power as superscript digits where it is whole: "²", "⁻¹", "^0.5", "" for 1."""
    if power == 1:
        return ""
    if power == int(power):
        return str(int(power)).translate(_SUPERSCRIPTS)
    return f"^{power:.6g}"


def unit_text(parts: tuple[tuple[str, float], ...]) -> str:
    """Write a unit from its symbols and powers: "kN/m", "N·mm³", "mm⁻²"."""
    over = [(symbol, power) for symbol, power in parts if power > 0]
    under = [(symbol, power) for symbol, power in parts if power < 0]
    if over and len(under) == 1:
        symbol, power = under[0]
        return f"{unit_text(tuple(over))}/{symbol}{power_text(-power)}"
    return "·".join(symbol + power_text(power) for symbol, power in (*over, *under))


def unit_latex(parts: tuple[tuple[str, float], ...]) -> str:
    r"""Write a unit as LaTeX: ``\text{kN/m}``, ``\text{N·mm}^{3}``."""
    over = [(symbol, power) for symbol, power in parts if power > 0]
    under = [(symbol, power) for symbol, power in parts if power < 0]
    pieces = [("·" if i else "", *part) for i, part in enumerate(over)]
    if over and len(under) == 1:
        pieces.append(("/", under[0][0], -under[0][1]))
    else:
        pieces += [("·" if i or over else "", *part) for i, part in enumerate(under)]
    latex = ""
    run = ""
    for join, symbol, power in pieces:
        run += join + symbol
        if power != 1:
            latex += rf"\text{{{run}}}^{{{power:.6g}}}"
            run = ""
    return latex + (rf"\text{{{run}}}" if run else "")
