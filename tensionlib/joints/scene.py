"""A small scene model: what a drawing is made of, before any file format.

Coordinates are in mm on the sheet, x to the right and y down. A style is a name: outlets turn it
into line weights or layers. A dimension chain stays a primitive, so that an outlet with real
dimensions can write them as such.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

Style = Literal[
    "member",
    "gusset",
    "hidden",
    "centre",
    "bolt",
    "weld",
    "net",
    "shear",
    "tension",
    "hatch",
    "force",
    "dimension",
    "break",
]
Anchor = Literal["start", "middle", "end"]
Point = tuple[float, float]

TEXT_HEIGHT = 4.7
"""Height of text on a sheet 160 mm wide: 2.35 mm when the drawing is printed 80 mm wide."""
_WIDE = {"m": 0.98, "M": 0.87, "W": 1.0, "w": 0.82, "N": 0.75, " ": 0.32, ".": 0.32, ",": 0.32}
_NARROW = 0.64  # of the text height, the average of a sans serif face


def text_width(text: str, height: float = TEXT_HEIGHT) -> float:
    """Width of a text as set, on the safe side, mm."""
    return height * sum(_WIDE.get(letter, _NARROW) for letter in text)


@dataclass(frozen=True, slots=True)
class Line:
    """A polyline, or a polygon when closed; a closed one is filled as its style says."""

    points: tuple[Point, ...]
    style: Style
    closed: bool = False


@dataclass(frozen=True, slots=True)
class Curve:
    """A closed outline of edges and arcs: (x, y) for a straight edge to a point, or
    (x, y, radius, turns_left) for an arc to it. The first entry is where it starts."""

    steps: tuple[tuple[float, ...], ...]
    style: Style


@dataclass(frozen=True, slots=True)
class Circle:
    x: float
    y: float
    r: float
    style: Style


@dataclass(frozen=True, slots=True)
class Text:
    x: float
    y: float
    text: str
    anchor: Anchor = "start"
    bold: bool = False
    height: float = TEXT_HEIGHT

    def box(self) -> tuple[float, float, float, float]:
        """Left, top, right, bottom of the text as set."""
        width = text_width(self.text, self.height)
        left = self.x - {"start": 0.0, "middle": width / 2, "end": width}[self.anchor]
        return left, self.y - 0.78 * self.height, left + width, self.y + 0.24 * self.height


@dataclass(frozen=True, slots=True)
class Chain:
    """A chain of dimensions along x ("x") or y ("y"): stops on the line, a label between each.

    `at` is where the line runs across; `reach` where the extension lines begin. `spots` are the
    places of the labels along the chain, spread so that they do not overlap.
    """

    axis: Literal["x", "y"]
    at: float
    stops: tuple[float, ...]
    reach: float
    texts: tuple[Text, ...]
    leaders: tuple[tuple[Point, Point], ...]


Item = Line | Curve | Circle | Text | Chain


@dataclass(frozen=True, slots=True)
class Scene:
    """A drawing: its size in mm and what is on it, back to front."""

    width: float
    height: float
    items: tuple[Item, ...]

    def texts(self) -> list[Text]:
        """Every text of the drawing, those of chains too."""
        found: list[Text] = []
        for item in self.items:
            if isinstance(item, Text):
                found.append(item)
            elif isinstance(item, Chain):
                found += item.texts
        return found


def support_strokes(start: Point, end: Point, outline: Sequence[Point]) -> list[Line]:
    """Short strokes along a supported edge of an outline, on its outer side."""
    (x1, y1), (x2, y2) = start, end
    length = max(math.dist(start, end), 1e-9)
    ux, uy = (x2 - x1) / length, (y2 - y1) / length
    cx = sum(x for x, _ in outline) / len(outline)
    cy = sum(y for _, y in outline) / len(outline)
    nx, ny = (-uy, ux) if (cx - x1) * -uy + (cy - y1) * ux < 0 else (uy, -ux)
    count = max(int(length / 2.4), 2)
    strokes = []
    for i in range(count + 1):
        x, y = x1 + ux * length * i / count, y1 + uy * length * i / count
        strokes.append(Line(((x, y), (x + 1.8 * nx - 1.2 * ux, y + 1.8 * ny - 1.2 * uy)), "break"))
    return strokes


def spread(wanted: list[float], sizes: list[float], gap: float) -> list[float]:
    """Places along a line as near as can be to those wanted, none overlapping.

    `sizes` are the lengths the labels take; order is kept.
    """
    if not wanted:
        return []
    # Blocks of labels that touch, each at the mean of where its labels want to be.
    blocks: list[tuple[float, float, list[int]]] = []
    for i, (centre, size) in enumerate(zip(wanted, sizes, strict=True)):
        blocks.append((centre, size, [i]))
        while len(blocks) > 1:
            (c1, s1, m1), (c2, s2, m2) = blocks[-2], blocks[-1]
            if c1 + s1 / 2 + gap <= c2 - s2 / 2:
                break
            size = s1 + s2 + gap
            members = m1 + m2
            offsets = _offsets([sizes[m] for m in members], gap)
            centre = sum(
                wanted[m] - offset + size / 2 for m, offset in zip(members, offsets, strict=True)
            ) / len(members)
            blocks[-2:] = [(centre, size, members)]
    places = [0.0] * len(wanted)
    for centre, size, members in blocks:
        offsets = _offsets([sizes[m] for m in members], gap)
        for member, offset in zip(members, offsets, strict=True):
            places[member] = centre - size / 2 + offset
    return places


def _offsets(sizes: list[float], gap: float) -> list[float]:
    """Centres of labels set side by side, from the left end."""
    out, at = [], 0.0
    for size in sizes:
        out.append(at + size / 2)
        at += size + gap
    return out


def chain_x(
    at: float, reach: float, stops: list[float], labels: list[str], *, above: bool = False
) -> Chain:
    """A chain along x. Labels stand over the line where all fit, else spread beyond it."""
    centres = [(a + b) / 2 for a, b in pairwise(stops)]
    widths = [text_width(label) for label in labels]
    fits = all(width <= b - a - 0.6 for width, (a, b) in zip(widths, pairwise(stops), strict=True))
    if fits:
        texts = [Text(c, at - 1.0, t, "middle") for c, t in zip(centres, labels, strict=True)]
        return Chain("x", at, tuple(stops), reach, tuple(texts), ())
    places = spread(centres, widths, 1.6)
    far = at - 3.6 if above else at + 7.2
    texts = [Text(p, far, t, "middle") for p, t in zip(places, labels, strict=True)]
    near = far + 1.4 if above else far - 4.0
    leaders = [((c, at), (p, near)) for c, p in zip(centres, places, strict=True)]
    return Chain("x", at, tuple(stops), reach, tuple(texts), tuple(leaders))


def chain_y(
    at: float, reach: float, stops: list[float], labels: list[str], *, side: Anchor = "end"
) -> Chain:
    """A chain along y, its labels beside the line: to the left ("end") or right ("start")."""
    centres = [(a + b) / 2 for a, b in pairwise(stops)]
    places = spread(centres, [TEXT_HEIGHT * 1.02] * len(labels), 0.5)
    sign = -1.0 if side == "end" else 1.0
    x = at + sign * 3.6
    texts = [
        Text(x, place + 0.32 * TEXT_HEIGHT, label, side)
        for place, label in zip(places, labels, strict=True)
    ]
    leaders = [
        ((at, centre), (x - sign * 0.6, place))
        for centre, place in zip(centres, places, strict=True)
    ]
    return Chain("y", at, tuple(stops), reach, tuple(texts), tuple(leaders))
