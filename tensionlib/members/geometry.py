"""Where an end's bolts or welds lie on the section, and whether they can lie there at all."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any, NoReturn

from tensionlib.errors import InputError
from tensionlib.joints.stated import in_mm
from tensionlib.members.member import End
from tensionlib.members.pieces import Given
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
    kind = {"bolted pattern": "bolted", "welded runs": "welded", "rod": "threaded"}.get(
        end.kind, end.kind
    )
    accepted = (_BOLTED if kind == "bolted" else _WELDED).get(section.shape, ())
    if kind == "pinned":
        accepted = ("plate",) if section.shape == "flat" else ()
    if kind == "threaded":
        accepted = ("rod",) if section.shape == "round" else ()
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
    if section.shape.startswith("double") and getattr(end.plate, "number", 1) == 2:
        raise InputError(
            f"plate: two cover plates on {section.designation}; a pair is spliced by the one plate"
            " in its gap: Covers(..., number=1)"
        )
    element = _ELEMENTS.get(end.to, end.to)
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


def check_gap(section: Section, end: End) -> None:
    """Refuse a pair whose gap is not its gusset's thickness: there are no packing plates in it.

    Raises
    ------
    InputError
        Naming the plate's thickness.
    """
    gap = section.dims.get("gap")
    plate = in_mm(end.plate.thickness)
    if gap is not None and not plate <= gap <= plate + _LOOSE:
        raise InputError(
            f"plate.thickness: got {plate:g} mm in the gap of {section.designation}; a gusset as"
            f" thick as the gap (to {_LOOSE:g} mm) is accepted, packing plates are not covered"
        )


# Holes of a regular end that overlap or leave the part ------------------------------------


@dataclass(frozen=True)
class Fit:
    """One thing that would not fit: `check` of what is given and the hole's diameter in mm raises
    an InputError naming the field, what came and what would fit. `reads` names the fields read.

    Distances below a standard's minimum but on the part are the standard's to judge.
    """

    check: Callable[[Given, float], None]
    reads: tuple[str, ...]


def _refuse(end: Any, name: str, why: str, least: float | None = None) -> NoReturn:
    value = getattr(end, name)
    shown = "missing" if value is None else format_value(in_mm(value), LENGTH)
    more = "" if least is None else f"; more than {format_value(least, LENGTH)} is due"
    raise InputError(f"{name}: {shown}; {why}{more}")


def _edge(name: str) -> Fit:
    def check(given: Given, hole: float) -> None:
        value = getattr(given.end, name)
        if value is not None and in_mm(value) <= hole / 2:
            _refuse(given.end, name, "the hole would cut the edge", hole / 2)

    return Fit(check, (f"end.{name}",))


def _pitch(given: Given, hole: float) -> None:
    end = given.end
    if end.per_line > 1 and end.pitch is not None and in_mm(end.pitch) <= hole:
        _refuse(end, "pitch", "the holes would overlap", hole)


def _lines(given: Given, hole: float) -> None:
    end = given.end
    if end.lines != 2 or end.line_spacing is None:
        return
    stagger, spacing = in_mm(end.stagger), in_mm(end.line_spacing)
    # Along the force, a bolt of the second line stands between two of the first.
    between = stagger if end.per_line == 1 or end.pitch is None else in_mm(end.pitch) - stagger
    step = min(stagger, between)
    if step < 0.0:
        _refuse(end, "stagger", "it is at most the pitch")
    if (step * step + spacing * spacing) ** 0.5 <= hole:
        _refuse(end, "line_spacing", "the holes of the two lines would overlap", hole)


def _across(given: Given, hole: float) -> None:
    """The lines of bolts across the element."""
    section, end = given.section, given.end
    place = seat(section, end)
    radius = hole / 2
    outer = in_mm(end.line_spacing) if end.lines == 2 else 0.0
    if place.lines_from == "heel":
        if end.gauge is None:
            _refuse(end, "gauge", "bolts through a channel's flanges are set out from its back")
        gauge = in_mm(end.gauge)
        other = section.thickness(_other(section, place))
        if gauge - radius <= other:
            why = "the hole would run into the other leg or the web"
            _refuse(end, "gauge", why, other + radius)
        if gauge + outer + radius >= place.width:
            _refuse(end, "gauge", f"the hole leaves the {place.element}, {place.width:g} mm wide")
        return
    if end.gauge is not None:
        _refuse(end, "gauge", f"bolts through the {end.to} stand about its middle; leave gauge out")
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


FITS = (
    *(_edge(name) for name in ("end_distance", "plate_end_distance", "plate_edge_distance")),
    Fit(_pitch, ("end.per_line", "end.pitch")),
    Fit(_lines, ("end.lines", "end.line_spacing", "end.stagger", "end.per_line", "end.pitch")),
    Fit(_across, ("section", "end.to", "end.lines", "end.gauge", "end.line_spacing")),
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
