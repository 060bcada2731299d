"""Where an end's bolts or welds lie on the section, and whether they can lie there at all."""

from __future__ import annotations

from dataclasses import dataclass

from tensionlib.errors import InputError
from tensionlib.joints.ends import Bolted
from tensionlib.joints.pattern_end import BoltedPattern
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.stated import in_mm
from tensionlib.members.member import End
from tensionlib.quantities import LENGTH, format_value
from tensionlib.steel import Section

_LOOSE = 1.0  # mm a gap may be wider than its gusset; common practice, no source
# The element of the section where an end is said to hold something else.
_ELEMENTS = {"both flanges": "flange", "slot": "wall", "bar": "plate", "rod": "plate"}
_LEGS = ("long leg", "short leg", "leg")

# Elements of each shape that an end may take hold of, by kind of end.
_BOLTED: dict[str, tuple[str, ...]] = {
    "angle": _LEGS,
    "double angle": _LEGS,
    "channel": ("web", "both flanges"),
    "double channel": ("web",),
    "I": ("web", "both flanges"),
    "tee": ("flange", "web"),
    "flat": ("plate",),
    "stated": ("plate",),
}
_WELDED: dict[str, tuple[str, ...]] = {
    **_BOLTED,
    "round": ("bar",),
    "CHS": ("slot",),
    "RHS": ("slot",),
}


@dataclass(frozen=True)
class Seat:
    """The element an end takes hold of.

    Lengths in mm: `thickness` and `width` of the element; `plies` elements of the member and
    `gussets` share the force; `planes` is shear planes a bolt. `lines_from` tells whether bolt
    lines are set out from the heel or about the middle; `free_edge` whether the element ends in a
    rolled edge beside the bolts (a web does not).
    """

    element: str
    thickness: float
    width: float
    plies: int
    gussets: int
    planes: int
    lines_from: str
    free_edge: bool


def seat(section: Section, end: End) -> Seat:
    """The seat of an end on a section.

    Raises
    ------
    InputError
        When the section has no such element, naming those it has.
    """
    kind = "bolted" if isinstance(end, Bolted | BoltedPattern) else "welded"
    accepted = (_BOLTED if kind == "bolted" else _WELDED).get(section.shape, ())
    if isinstance(end, Pinned):
        kind, accepted = "pinned", ("plate",) if section.shape == "flat" else ()
    if isinstance(end, Threaded):
        kind, accepted = "threaded", ("rod",) if section.shape == "round" else ()
    if not accepted:
        raise InputError(
            f"to: {section.designation} ({section.shape}) cannot be {kind} in this library;"
            " weld tubes and round bars by 'slot' and 'bar'"
        )
    equal = section.shape in ("angle", "double angle") and section.leg("long leg") == section.leg(
        "short leg"
    )
    if end.to not in accepted or (end.to == "leg" and not equal):
        named = [n for n in accepted if n != "leg" or equal]
        raise InputError(
            f"to: got {end.to!r}; {section.designation} ({section.shape}) can be {kind} by its"
            f" {', '.join(map(repr, named))}"
        )
    if section.facing and end.to not in (section.facing, "leg"):
        raise InputError(
            f"to: got {end.to!r}; the two parts of {section.designation} face the gusset by their"
            f" {section.facing}"
        )
    _check_gap(section, end)
    if section.shape.startswith("double") and getattr(end.plate, "number", 1) == 2:
        raise InputError(
            f"plate: two cover plates on {section.designation}; a pair is spliced by the one plate"
            " in its gap: Covers(..., number=1)"
        )
    element = {"both flanges": "flange", "slot": "wall", "bar": "plate", "rod": "plate"}.get(
        end.to, end.to
    )
    double = section.shape.startswith("double")
    both = end.to == "both flanges"
    return Seat(
        element=element,
        thickness=section.thickness(element),
        width=section.leg(element),
        plies=2 if double or both else 1,
        gussets=2 if both else 1,
        planes=2 if double or getattr(end.plate, "number", 1) == 2 else 1,
        lines_from="heel" if end.to in _LEGS or (both and section.shape == "channel") else "middle",
        free_edge=end.to != "web",
    )


def _check_gap(section: Section, end: End) -> None:
    """A pair's gap is the gusset's thickness: no less, and no packing plates."""
    gap = section.dims.get("gap")
    plate = in_mm(end.plate.thickness)
    if gap is not None and not plate <= gap <= plate + _LOOSE:
        raise InputError(
            f"plate.thickness: got {plate:g} mm in the gap of {section.designation}; a gusset as"
            f" thick as the gap (to {_LOOSE:g} mm) is accepted, packing plates are not covered"
        )


def check_fit(section: Section, end: Bolted, place: Seat, hole: float) -> None:
    """Refuse holes that overlap or leave the part. `hole` is the hole's diameter, mm.

    Distances below a standard's minimum but on the part are the standard's to judge.

    Raises
    ------
    InputError
        Naming the field, what came and what would fit.
    """

    def length(name: str) -> float | None:
        value = getattr(end, name)
        return None if value is None else value.internal

    def refuse(name: str, why: str, least: float | None = None) -> None:
        value = length(name)
        shown = "missing" if value is None else format_value(value, LENGTH)
        more = "" if least is None else f"; more than {format_value(least, LENGTH)} is due"
        raise InputError(f"{name}: {shown}; {why}{more}")

    radius = hole / 2
    for name in ("end_distance", "plate_end_distance", "plate_edge_distance"):
        value = length(name)
        if value is not None and value <= radius:
            refuse(name, "the hole would cut the edge", radius)
    pitch, spacing, stagger = length("pitch"), length("line_spacing"), length("stagger") or 0.0
    if end.per_line > 1 and pitch is not None and pitch <= hole:
        refuse("pitch", "the holes would overlap", hole)
    if end.lines == 2 and spacing is not None:
        # Along the force, a bolt of the second line stands between two of the first.
        between = stagger if end.per_line == 1 or pitch is None else pitch - stagger
        step = min(stagger, between)
        if step < 0.0:
            refuse("stagger", "it is at most the pitch")
        if (step * step + spacing * spacing) ** 0.5 <= hole:
            refuse("line_spacing", "the holes of the two lines would overlap", hole)
    outer = (spacing or 0.0) if end.lines == 2 else 0.0
    if place.lines_from == "heel":
        gauge = length("gauge")
        if gauge is None:
            refuse("gauge", "bolts through a channel's flanges are set out from its back")
            return
        if gauge - radius <= section.thickness(_other(section, place)):
            refuse(
                "gauge",
                "the hole would run into the other leg or the web",
                section.thickness(_other(section, place)) + radius,
            )
        if gauge + outer + radius >= place.width:
            refuse("gauge", f"the hole leaves the {place.element}, {place.width:g} mm wide")
        return
    if end.gauge is not None:
        refuse("gauge", f"bolts through the {end.to} stand about its middle; leave gauge out")
    clear = place.width
    if place.element == "web":
        # Between the flanges; a tee has one, and its lines stand in the middle.
        clear -= 2 * section.thickness("flange")
    if outer / 2 + radius >= clear / 2:
        name = "line_spacing" if end.lines == 2 else "bolts"
        raise InputError(
            f"{name}: the hole leaves the {place.element}, which has {clear:g} mm for it"
        )
    if place.element == "flange" and section.shape in ("I", "tee"):
        web = section.thickness("web")
        if outer / 2 - radius <= web / 2:
            raise InputError(
                "lines: bolts through a flange stand either side of the web; give lines=2 and a"
                f" line_spacing of more than {web + hole:g} mm"
            )


def _other(section: Section, place: Seat) -> str:
    if section.shape == "channel":
        return "web"
    return {"long leg": "short leg", "short leg": "long leg"}.get(place.element, place.element)


def thickest(section: Section) -> float:
    """Thickness that sets the yield stress: the thickest element, the conservative reading."""
    sizes = [section.dims[n] for n in ("t", "t_f", "t_w") if n in section.dims]
    if not sizes and "d" in section.dims:
        sizes = [section.dims["d"]]
    if not sizes:
        raise InputError(
            f"section: {section.designation} states no thickness; give t so that the grade's yield"
            " stress can be read"
        )
    return max(sizes)
