"""A section opened flat: where a hole of each element lies on it.

An angle and a channel are one sheet folded, so a net-section chain may run across all of it. The
flanges and the web of an I or a tee meet in a T: each is a sheet of its own there, and what their
chains lose is added up, which credits no stagger between them (the conservative reading).
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace

from tensionlib.errors import InputError, did_you_mean
from tensionlib.joints.parts import Flat, opened_angle, opened_channel
from tensionlib.steel import Section


@dataclass(frozen=True)
class OpenedSheet:
    """One sheet: a flat part, and for each element where its y = 0 lies and which way y runs."""

    title: str
    part: Flat
    places: Mapping[str, tuple[float, float]]
    folds: tuple[tuple[float, str], ...] = ()

    def across(self, element: str, y: float) -> float:
        """Where a point at y across an element lies across the sheet, mm."""
        origin, sign = self.places[element]
        return origin + sign * y


@dataclass(frozen=True)
class Opened:
    """The sheets of one component, and how many such components the section has."""

    sheets: tuple[OpenedSheet, ...]
    components: int

    @property
    def elements(self) -> tuple[str, ...]:
        return tuple(element for sheet in self.sheets for element in sheet.places)

    def sheet(self, element: str) -> OpenedSheet:
        """The sheet that has an element.

        Raises
        ------
        InputError
            For an element the section does not have, naming those it has.
        """
        for sheet in self.sheets:
            if element in sheet.places:
                return sheet
        raise InputError(
            f"element: got {element!r}; this section has {', '.join(map(repr, self.elements))}."
            + did_you_mean(element, self.elements)
        )


def opened(section: Section) -> Opened:
    """The section opened flat.

    Raises
    ------
    InputError
        For a section whose holes are not offered as points: a tube, a round bar.
    """
    d = section.dims
    sheets: tuple[OpenedSheet, ...]
    match section.shape.removeprefix("double "):
        case "angle":
            b_1, b_2, t = d["b1"], d["b2"], d["t"]
            heel = b_1 - t / 2
            names = ("leg", "other leg") if b_1 == b_2 else ("long leg", "short leg")
            sheets = (
                OpenedSheet(
                    "both legs opened flat",
                    opened_angle(b_1, b_2, t),
                    {names[0]: (b_1, -1.0), names[1]: (b_1 - t, 1.0)},
                    ((heel, "heel"),),
                ),
            )
        case "channel":
            part = opened_channel(d["d"], d["b_f"], d["t_f"], d["t_w"])
            back = d["b_f"] - (d["t_w"] + d["t_f"]) / 2
            far = back + d["d"] - (d["t_w"] + d["t_f"]) / 2
            places = {"flange 1": (d["b_f"], -1.0), "web": (back, 1.0), "flange 2": (far, 1.0)}
            folds = tuple((strip.low, "fold") for strip in part.strips[1:])
            sheets = (OpenedSheet("flanges and web opened flat", part, places, folds),)
        case "I":
            flange = Flat.plain(d["b_f"], d["t_f"])
            web = Flat.plain(d["d"], d["t_w"], low_free=False, high_free=False)
            sheets = (
                OpenedSheet("flange 1", flange, {"flange 1": (0.0, 1.0)}),
                OpenedSheet("web", web, {"web": (0.0, 1.0)}),
                OpenedSheet("flange 2", flange, {"flange 2": (0.0, 1.0)}),
            )
        case "tee":
            sheets = (
                OpenedSheet("flange", Flat.plain(d["b_f"], d["t_f"]), {"flange": (0.0, 1.0)}),
                OpenedSheet(
                    "web", Flat.plain(d["d"], d["t_w"], high_free=False), {"web": (0.0, 1.0)}
                ),
            )
        case "flat" | "stated":
            plate = Flat.plain(section.leg("plate"), section.thickness("plate"))
            sheets = (OpenedSheet("plate", plate, {"plate": (0.0, 1.0)}),)
        case _:
            raise InputError(
                f"holes: {section.designation} ({section.shape}) takes no holes in this library"
            )
    return Opened(sheets, 2 if section.shape.startswith("double ") else 1)


def element_part(section: Section, element: str) -> Flat:
    """One element alone, as a part that a block may tear out of.

    An edge where the element meets another is not free. y runs as the element's own.
    """
    shape = section.shape.removeprefix("double ")
    name = element.removesuffix(" 1").removesuffix(" 2")
    if name == "other leg":
        name = "leg"
    t, b = section.thickness(name), section.leg(name)
    low_free = shape in ("flat", "stated", "tee") or (shape == "I" and name == "flange")
    plain = Flat.plain(b, t, low_free=low_free, high_free=name != "web")
    backed = name == "flange" and shape in ("I", "tee")
    return replace(plain, backs=(b / 2,)) if backed else plain
