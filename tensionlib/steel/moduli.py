"""Elastic section moduli and the slenderness of a section's plates, for bending beside tension.

All lengths in mm, moduli in mm³.
"""

from __future__ import annotations

from tensionlib.errors import InputError
from tensionlib.steel import shapes
from tensionlib.steel.outline import Circle, Properties
from tensionlib.steel.sections import Section


def elastic_moduli(section: Section) -> tuple[float, float]:
    """Effective elastic moduli for a moment about x alone and about y alone.

    The stress at every corner of the outline is that of unsymmetrical bending, so that an angle
    bent about an axis parallel to a leg counts its product of inertia; corners count sharp, which
    is on the safe side. Axes of `shapes`.

    Raises
    ------
    InputError
        For a section given by stated properties alone.
    """
    shape = section.shape.removeprefix("double ")
    if shape not in shapes.DIMENSIONS:
        raise InputError(
            f"section: {section.designation} has no outline, so no section modulus is known; give"
            " a catalogue section for a member that bends"
        )
    outline = shapes.outline(shape, section.dims)
    one = Properties.of(outline.moments())
    if isinstance(outline.outer, Circle):
        r = outline.outer.r
        return one.I_x / r, one.I_y / r
    points = [(c.x - one.x_c, c.y - one.y_c) for c in outline.outer]
    I_x, I_y, I_xy = one.I_x, one.I_y, one.I_xy
    if section.shape != shape:
        # A pair is symmetrical about the middle of its gap.
        half = section.dims["gap"] / 2
        assert section.I_x is not None
        assert section.I_y is not None
        I_x, I_y, I_xy = section.I_x, section.I_y, 0.0
        if section.facing == "short leg":
            points = [(x, y + one.y_c + half) for x, y in points]
        else:
            points = [(x + one.x_c + half, y) for x, y in points]
    spread = I_x * I_y - I_xy * I_xy
    Z_x = min(spread / abs(I_y * y - I_xy * x) for x, y in points if abs(I_y * y - I_xy * x) > 0.0)
    Z_y = min(spread / abs(I_x * x - I_xy * y) for x, y in points if abs(I_x * x - I_xy * y) > 0.0)
    return Z_x, Z_y


def sag_inertia(section: Section) -> float:
    """Second moment that resists a load along y on a section free to move aside, mm⁴.

    An angle loaded along a leg sags about its own axes: I_x less I_xy²/I_y.

    Raises
    ------
    InputError
        For a section given by stated properties alone.
    """
    if section.shape.startswith("double "):
        assert section.I_x is not None
        return section.I_x
    if section.shape not in shapes.DIMENSIONS:
        raise InputError(f"section: {section.designation} has no outline, so its sag is not known")
    one = Properties.of(shapes.outline(section.shape, section.dims).moments())
    return one.I_x - one.I_xy**2 / one.I_y


def slender_plate(section: Section) -> tuple[float, float, str] | None:
    """Clear width, thickness and kind of the most slender plate; None where none can be slender.

    An "outstand" is a leg of an angle, half a flange, the stem of a tee; a "wall" that of a
    rectangular tube; "round" a circular tube, its diameter and wall. The webs of the channels and
    I sections of the catalogue are stocky enough for bending.
    """
    d = section.dims
    match section.shape.removeprefix("double "):
        case "angle":
            return d["b1"] - d["t"], d["t"], "outstand"
        case "channel":
            return d["b_f"] - d["t_w"], d["t_f"], "outstand"
        case "I":
            return (d["b_f"] - d["t_w"]) / 2, d["t_f"], "outstand"
        case "tee":
            flange = (d["b_f"] - d["t_w"]) / 2, d["t_f"], "outstand"
            stem = d["d"] - d["t_f"], d["t_w"], "outstand"
            return max(flange, stem, key=lambda plate: plate[0] / plate[1])
        case "RHS":
            return max(d["d"], d["b"]) - 2 * d["t"], d["t"], "wall"
        case "CHS":
            return d["d"], d["t"], "round"
        case _:
            return None


def component_radius(section: Section) -> float:
    """Least radius of gyration of one component of a pair, or of a single section, mm."""
    shape = section.shape.removeprefix("double ")
    return Properties.of(shapes.outline(shape, section.dims).moments()).r_min
