"""Sections: the catalogue, sections of your own, and pairs.

Numbers are floats in mm, mm², mm⁴ and kg/m. Properties are computed from the outline, fillets and
toe radii included; the catalogue's dimensions are the standard tables' own, from memory, and its
tests compare every computed area with the listed mass or area of the row.
"""

from __future__ import annotations

import csv
import re
from collections.abc import Mapping
from dataclasses import dataclass, field
from decimal import ROUND_HALF_UP, Decimal
from functools import cache, cached_property
from importlib.resources import files
from types import MappingProxyType
from typing import TYPE_CHECKING, Any

from tensionlib.errors import DataNotFoundError, InputError, did_you_mean
from tensionlib.quantities import AREA, LENGTH, MASS_PER_LENGTH, Quantity, Role, door
from tensionlib.steel import shapes
from tensionlib.steel.outline import Outline, Properties

if TYPE_CHECKING:
    import numpy as np
    import numpy.typing as npt

DENSITY = 7850e-9  # kg/mm3, AS/NZS 3679.1 and AS/NZS 1163, from memory

FAMILIES: dict[str, tuple[str, str]] = {
    "EA": ("angle", "equal angles"),
    "UA": ("angle", "unequal angles"),
    "PFC": ("channel", "parallel flange channels"),
    "UB": ("I", "universal beams"),
    "UC": ("I", "universal columns"),
    "BT": ("tee", "tees cut from universal beams"),
    "CT": ("tee", "tees cut from universal columns"),
    "FL": ("flat", "flats"),
    "RB": ("round", "round bars"),
    "CHS": ("CHS", "circular hollow sections"),
    "SHS": ("RHS", "square hollow sections"),
    "RHS": ("RHS", "rectangular hollow sections"),
}
_CUT = {"BT": "UB", "CT": "UC"}

# What an end may take hold of: thickness and width of each element, by dimension.
_ELEMENTS: dict[str, dict[str, tuple[str, str]]] = {
    "angle": {"long leg": ("t", "b1"), "short leg": ("t", "b2"), "leg": ("t", "b1")},
    "channel": {"web": ("t_w", "d"), "flange": ("t_f", "b_f")},
    "I": {"web": ("t_w", "d"), "flange": ("t_f", "b_f")},
    "tee": {"web": ("t_w", "d"), "flange": ("t_f", "b_f")},
    "flat": {"plate": ("t", "b")},
    "round": {"plate": ("d", "d")},
    "CHS": {"wall": ("t", "d")},
    "RHS": {"wall": ("t", "d")},
    "stated": {"plate": ("t", "b")},
}
_ELEMENTS["double angle"] = _ELEMENTS["angle"]
_ELEMENTS["double channel"] = _ELEMENTS["channel"]


@dataclass(frozen=True)
class Section:
    """A section. `mass` is kg/m; `x_c`, `y_c` the centroid in the axes of `shapes`.

    `facing` names the element by which the two components of a pair face each other, "" for a
    single section. `I_x`, `I_y` are about the centroid, parallel to the axes of `shapes`.
    A section given by stated properties alone has None for what was not stated.
    """

    designation: str
    family: str
    shape: str
    dims: Mapping[str, float]
    A: float
    mass: float
    source: str
    x_c: float | None = None
    y_c: float | None = None
    I_x: float | None = None
    I_y: float | None = None
    r_min: float | None = None
    facing: str = ""
    A_listed: float | None = field(default=None, compare=False)

    def __hash__(self) -> int:
        return hash((self.designation, self.shape, self.A, tuple(self.dims.items())))

    # A mapping proxy does not go through pickle; its dict does.
    def __getstate__(self) -> dict[str, Any]:
        return self.__dict__ | {"dims": dict(self.dims)}

    def __setstate__(self, state: dict[str, Any]) -> None:
        self.__dict__.update(state | {"dims": MappingProxyType(state["dims"])})

    @property
    def r_x(self) -> float | None:
        return None if self.I_x is None else (self.I_x / self.A) ** 0.5

    @property
    def r_y(self) -> float | None:
        return None if self.I_y is None else (self.I_y / self.A) ** 0.5

    @property
    def elements(self) -> tuple[str, ...]:
        """What the section has that an end may take hold of."""
        return tuple(_ELEMENTS[self.shape])

    def thickness(self, element: str) -> float:
        """Thickness of an element, mm. Raises InputError for one the section does not have."""
        return self._dimension(element, 0)

    def leg(self, element: str) -> float:
        """Width of an element across the force, mm: a leg's length, a web's depth."""
        return self._dimension(element, 1)

    def _dimension(self, element: str, which: int) -> float:
        known = _ELEMENTS[self.shape]
        if element not in known:
            raise InputError(
                f"element: {self.designation} has no {element!r}; it has {', '.join(known)}"
            )
        name = known[element][which]
        if name not in self.dims:
            raise InputError(f"{name}: {self.designation} states no {name}; give it with its unit")
        return self.dims[name]

    def outline(self) -> Outline:
        """The outline of a single section.

        Raises
        ------
        InputError
            For a pair or for stated properties, which have none.
        """
        if self.shape not in shapes.DIMENSIONS:
            raise InputError(f"outline: {self.designation} is no single shape with dimensions")
        return shapes.outline(self.shape, self.dims)


def _made(
    designation: str,
    family: str,
    shape: str,
    dims: Mapping[str, float],
    source: str,
    *,
    mass: float | None = None,
    A_listed: float | None = None,
) -> Section:
    p = Properties.of(shapes.outline(shape, dims).moments())
    return Section(
        designation=designation,
        family=family,
        shape=shape,
        dims=MappingProxyType(dict(dims)),
        A=p.A,
        mass=p.A * DENSITY * 1000.0 if mass is None else mass,
        source=source,
        x_c=p.x_c,
        y_c=p.y_c,
        I_x=p.I_x,
        I_y=p.I_y,
        r_min=p.r_min,
        A_listed=A_listed,
    )


# Catalogue --------------------------------------------------------------------------------


@dataclass(frozen=True)
class Catalogue:
    """All listed sections; a row number stands for a section in array work."""

    sections: tuple[Section, ...]

    @cached_property
    def designations(self) -> tuple[str, ...]:
        return tuple(s.designation for s in self.sections)

    @cached_property
    def _rows(self) -> dict[str, int]:
        return {designation: row for row, designation in enumerate(self.designations)}

    def row(self, designation: str) -> int:
        """Row number of a designation. Raises DataNotFoundError for one that is not listed."""
        row = self._rows.get(section(designation).designation)
        if row is None:
            raise DataNotFoundError(
                f"designation: {designation!r} is a pair, which is not a row of the catalogue"
            )
        return row

    def column(self, name: str) -> npt.NDArray[np.float64]:
        """A property or dimension of every row, shape (rows,); NaN where a row has none.

        Raises
        ------
        DataNotFoundError
            For a name that is neither, with the nearest names.
        """
        import numpy as np

        if name in _PROPERTIES:
            return np.array([getattr(s, name) for s in self.sections], dtype=float)
        if name in _DIMENSIONS:
            return np.array([s.dims.get(name) for s in self.sections], dtype=float)
        known = (*_PROPERTIES, *_DIMENSIONS)
        raise DataNotFoundError(
            f"column: {name!r} is not listed; there are {', '.join(known)}."
            + did_you_mean(str(name), known)
        )


_PROPERTIES = ("A", "mass", "x_c", "y_c", "I_x", "I_y", "r_x", "r_y", "r_min")
_DIMENSIONS = tuple(dict.fromkeys(n for names in shapes.DIMENSIONS.values() for n in names))


@cache
def catalogue() -> Catalogue:
    """The catalogue, read on first use."""
    return Catalogue(tuple(s for family in FAMILIES for s in _family(family)))


@cache
def _family(family: str) -> tuple[Section, ...]:
    shape = FAMILIES[family][0]
    if family in _CUT:
        return tuple(_tee_from(family, parent) for parent in _family(_CUT[family]))
    text = (files(__package__) / "catalogue" / f"{family}.csv").read_text(encoding="utf-8")
    return tuple(
        _made(
            row["designation"],
            family,
            shape,
            {name: float(row[name]) for name in shapes.DIMENSIONS[shape]},
            row["source"],
            mass=float(row["mass"]),
            A_listed=float(row["A_listed"]) if row.get("A_listed") else None,
        )
        for row in csv.DictReader(text.splitlines())
    )


def _tee_from(family: str, parent: Section) -> Section:
    """Half of a beam or column, the saw cut neglected.

    Its designation carries half of the parent's mass: a printed list may differ in the last figure.
    """
    nominal, _, mass = parent.designation.split()
    half = Decimal(mass) / 2
    dims = {**parent.dims, "d": parent.dims["d"] / 2}
    return _made(
        f"{Decimal(nominal) / 2:f} {family} {half.quantize(Decimal('0.1'), ROUND_HALF_UP)}",
        family,
        "tee",
        dims,
        f"half of {parent.designation}, saw cut neglected; {parent.source}",
        mass=float(half),
        A_listed=None if parent.A_listed is None else parent.A_listed / 2,
    )


def _folded(name: str) -> str:
    return "".join(name.upper().replace("×", "X").split())


@cache
def _by_designation(family: str) -> dict[str, Section]:
    return {_folded(s.designation): s for s in _family(family)}


_PAIR = re.compile(r"2\s*/(.+)", re.DOTALL)
_FACING = {"long legs": "long leg", "short legs": "short leg", "legs": "long leg", "webs": "web"}

_PAIR_FORMS = " write it as '2/150x90x10 UA, long legs, gap 12 mm' or '2/150 PFC, webs, gap 16 mm'"


def _pair(name: str, written: str) -> Section:
    """The pair that `name` means, `written` what stands after its "2/"."""
    single, *rest = (part.strip() for part in written.split(","))
    one = section(single)
    gap, facing = "", "web" if one.shape == "channel" else "long leg"
    for part in rest:
        words = " ".join(part.lower().removesuffix("back to back").split())
        if words.startswith("gap "):
            gap = part[len("gap ") :]
        elif words in _FACING:
            facing = _FACING[words]
        else:
            raise InputError(f"section: {part!r} in {name!r} says nothing of a pair;{_PAIR_FORMS}")
    if not gap:
        raise InputError(f"section: {name!r} states no gap;{_PAIR_FORMS}")
    return double(one, gap, facing)


def section(name: str) -> Section:
    """A section by its designation, tolerant of blanks, case and ×.

    "150x90x10 UA", "100x100x8 EA", "150 PFC", "310 UB 40.4", "155 BT 20.2", "100x12 FL", "30 RB",
    "114.3x4.8 CHS", "150x100x6.0 RHS". A pair is "2/150x90x10 UA, long legs, gap 12 mm" or
    "2/150 PFC, webs, gap 16 mm", in either order and with "back to back" or without; angles face
    each other by their long legs unless "short legs" is written.

    Raises
    ------
    InputError, DataNotFoundError
        For what is not in the catalogue, with the nearest names.
    """
    if not isinstance(name, str):
        raise InputError(f"section: got {name!r}; a designation is due, for example '150x90x10 UA'")
    pair = _PAIR.fullmatch(name.strip())
    if pair:
        return _pair(name, pair[1])
    folded = _folded(name)
    # The family is in the name, so that one look-up reads one family's table.
    family = "".join(c for c in folded if c.isalpha() and c != "X")
    found = _by_designation(family).get(folded) if family in FAMILIES else None
    if found is None:
        near = did_you_mean(name, catalogue().designations)
        hint = "" if near else " For example '150x90x10 UA', '150 PFC', '114.3x4.8 CHS'."
        raise DataNotFoundError(f"section: {name!r} is not in the catalogue.{near}{hint}")
    return found


def find(
    family: str | None = None,
    *,
    A_min: Quantity | str | None = None,
    leg: Quantity | str | None = None,
    depth: Quantity | str | None = None,
    thickness_min: Quantity | str | None = None,
    mass_max: Quantity | str | None = None,
) -> list[Section]:
    """Catalogue sections that fit, lightest first.

    Parameters
    ----------
    family : str
        "EA", "UA", "PFC", …
    A_min : area
    leg : length
        Length of a leg of an angle.
    depth : length
        Depth of the section, or the width of a flat.
    thickness_min : length
        Least thickness of every element.
    mass_max : mass per length

    Raises
    ------
    DataNotFoundError, UnitError, InputError
    """
    if family is not None and family not in FAMILIES:
        raise DataNotFoundError(
            f"family: {family!r} is not in the catalogue; there are {', '.join(FAMILIES)}."
            + did_you_mean(str(family), FAMILIES)
        )

    def limit(name: str, value: Quantity | str | None, role: Role) -> float | None:
        return None if value is None else door(name, value, role, above=0.0).internal

    area = limit("A_min", A_min, AREA)
    wanted_leg = limit("leg", leg, LENGTH)
    wanted_depth = limit("depth", depth, LENGTH)
    thinnest = limit("thickness_min", thickness_min, LENGTH)
    heaviest = limit("mass_max", mass_max, MASS_PER_LENGTH)

    def fits(s: Section) -> bool:
        d = s.dims
        return (
            (family is None or s.family == family)
            and (area is None or area <= s.A)
            and (wanted_leg is None or wanted_leg in (d.get("b1"), d.get("b2")))
            and (wanted_depth is None or wanted_depth == d.get("d", d.get("b")))
            and (
                thinnest is None or min(s.thickness(element) for element in s.elements) >= thinnest
            )
            and (heaviest is None or s.mass / 1000.0 <= heaviest)
        )

    return sorted(filter(fits, catalogue().sections), key=lambda s: s.mass)


# Sections of your own ---------------------------------------------------------------------


def by_dimensions(shape: str, designation: str = "", **dims: Quantity | str) -> Section:
    """A section by its dimensions, names as in `shapes.DIMENSIONS`; radii default to zero.

    ``by_dimensions("angle", b1="140 mm", b2="90 mm", t="12 mm", r1="10 mm", r2="5 mm")``

    Raises
    ------
    DataNotFoundError, UnitError, InputError
        Naming the shape or dimension, what came and what is accepted.
    """
    if shape not in shapes.DIMENSIONS:
        raise DataNotFoundError(
            f"shape: {shape!r} is not known; there are {', '.join(shapes.DIMENSIONS)}."
            + did_you_mean(str(shape), shapes.DIMENSIONS)
        )
    names = shapes.DIMENSIONS[shape]
    for name in dims:
        if name not in names:
            raise InputError(
                f"{name}: the {shape} has no such dimension; it has {', '.join(names)}."
                + did_you_mean(name, names)
            )
    sizes = {}
    for name in names:
        if name in dims:
            sizes[name] = door(name, dims[name], LENGTH, at_least=0.0, example="12 mm").internal
        elif name in ("r1", "r2", "r_ext"):
            sizes[name] = 0.0
        else:
            raise InputError(f"{name}: missing; the {shape} needs {', '.join(names)}")
    shown = designation or f"{shape} " + "x".join(
        f"{sizes[n]:g}" for n in names if n not in ("r1", "r2", "r_ext")
    )
    return _made(shown, "", shape, sizes, "dimensions stated by the user")


def stated(
    designation: str,
    *,
    A: Quantity | str,
    t: Quantity | str,
    source: str,
    b: Quantity | str | None = None,
    r_min: Quantity | str | None = None,
) -> Section:
    """A section by stated properties: area, thickness at the connection, width, least radius.

    `source` says where the properties come from and is printed beside them.

    Raises
    ------
    UnitError, InputError
    """
    if not isinstance(source, str) or not source.strip():
        raise InputError("source: missing; say where the properties come from")
    dims = {"t": door("t", t, LENGTH, above=0.0, example="10 mm").internal}
    if b is not None:
        dims["b"] = door("b", b, LENGTH, above=0.0, example="120 mm").internal
    area = door("A", A, AREA, above=0.0, example="1810 mm2").internal
    radius = None if r_min is None else door("r_min", r_min, LENGTH, above=0.0).internal
    return Section(
        designation,
        "",
        "stated",
        MappingProxyType(dims),
        area,
        area * DENSITY * 1000.0,
        source,
        r_min=radius,
    )


def double(single: Section | str, gap: Quantity | str, facing: str) -> Section:
    """Two equal angles or channels facing each other across a gap.

    Parameters
    ----------
    single : Section or str
    gap : length
        Clear distance between them: the thickness of the gusset.
    facing : str
        "long leg", "short leg" or "web": the elements that face each other.

    Raises
    ------
    InputError
        For a section that does not make pairs, or an element it does not have.
    """
    one = section(single) if isinstance(single, str) else single
    accepted = {"angle": ("long leg", "short leg"), "channel": ("web",)}.get(one.shape, ())
    if facing not in accepted:
        raise InputError(
            f"facing: got {facing!r}; {one.designation} makes pairs by its {', '.join(accepted)}"
            if accepted
            else f"single: {one.designation} makes no pairs; angles and channels do"
        )
    apart = door("gap", gap, LENGTH, at_least=0.0, example="12 mm").internal
    assert one.x_c is not None
    assert one.y_c is not None
    assert one.I_x is not None
    assert one.I_y is not None
    A = 2 * one.A
    if facing == "short leg":
        I_x = 2 * (one.I_x + one.A * (one.y_c + apart / 2) ** 2)
        I_y = 2 * one.I_y
    else:
        I_x = 2 * one.I_x
        I_y = 2 * (one.I_y + one.A * (one.x_c + apart / 2) ** 2)
    words = {"long leg": "long legs", "short leg": "short legs", "web": "webs"}[facing]
    return Section(
        designation=f"2/{one.designation}, {words}, gap {apart:g} mm",
        family=f"2{one.family}",
        shape=f"double {one.shape}",
        dims=MappingProxyType({**one.dims, "gap": apart}),
        A=A,
        mass=2 * one.mass,
        source=one.source,
        I_x=I_x,
        I_y=I_y,
        r_min=(min(I_x, I_y) / A) ** 0.5,
        facing=facing,
    )
