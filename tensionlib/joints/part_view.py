"""A part by itself, true to scale: a leg or web opened flat, a gusset, a cover plate.

It shows the part's outline, its holes by their marks, the net section that governs and the block
that tears out first; each by line style, hatching and legend, none by colour alone. Coordinates
are the part's own, in mm: x along the force, y across it and upwards.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

from tensionlib.joints.parts import Opening
from tensionlib.joints.scene import (
    TEXT_HEIGHT,
    Circle,
    Curve,
    Item,
    Line,
    Point,
    Scene,
    Style,
    Text,
    chain_x,
    chain_y,
    support_strokes,
    text_width,
)

SHEET = 160.0
_WIDE, _TALL = 112.0, 58.0
_LEFT, _TOP = 34.0, 15.0
_HATCH = 2.4


@dataclass(frozen=True)
class Segment:
    """A piece of a failure surface: "shear" or "tension" from one point to another."""

    kind: str
    start: Point
    end: Point


@dataclass(frozen=True)
class PartView:
    """What a part's drawing shows.

    `cut` are the edges of the outline, by the index of their first corner, where the drawing
    breaks off and the part goes on, `held` those welded to a support. `folds` are lines along the
    force with a word each. `net` is the net section that governs, from edge to edge, `block` the
    pieces of the tear-out block and `torn` the area it takes out; the labels say what they are.
    `along` and `across` are stops of dimension chains.
    """

    title: str
    outline: tuple[Point, ...]
    cut: tuple[int, ...] = ()
    held: tuple[int, ...] = ()
    folds: tuple[tuple[float, str], ...] = ()
    holes: tuple[Opening, ...] = ()
    net: tuple[Point, ...] = ()
    net_label: str = ""
    block: tuple[Segment, ...] = ()
    torn: tuple[tuple[Point, ...], ...] = ()
    block_labels: tuple[str, ...] = ()
    along: tuple[float, ...] = ()
    across: tuple[float, ...] = ()
    notes: tuple[str, ...] = ()

    @property
    def box(self) -> tuple[float, float, float, float]:
        """Left, bottom, right, top of the outline."""
        xs, ys = [x for x, _ in self.outline], [y for _, y in self.outline]
        return min(xs), min(ys), max(xs), max(ys)


def describe_part(view: PartView) -> str:
    """The drawing in words, for who cannot see it."""
    holes = "; ".join(
        f"hole {h.mark} of {_size(h)} at {h.x:.5g} along and {h.y:.5g} across"
        + ("" if h.bolt else ", no bolt")
        for h in view.holes
    )
    said = [view.title + ", to scale, mm", holes, view.net_label, *view.block_labels, *view.notes]
    return "; ".join(part for part in said if part) + "."


def _size(hole: Opening) -> str:
    if hole.along == hole.across:
        return f"{hole.across:g} mm"
    return f"{hole.along:g} by {hole.across:g} mm"


def part_scene(view: PartView) -> Scene:
    """The drawing on a sheet 160 mm wide."""
    return _Drawing(view).scene()


class _Drawing:
    def __init__(self, view: PartView) -> None:
        self.view = view
        left, bottom, right, top = view.box
        self.scale = min(_WIDE / (right - left), _TALL / (top - bottom))
        self.x_0, self.y_0 = left, top
        self.bottom = _TOP + (top - bottom) * self.scale
        self.items: list[Item] = []

    def at(self, x: float, y: float) -> Point:
        return _LEFT + (x - self.x_0) * self.scale, _TOP + (self.y_0 - y) * self.scale

    def scene(self) -> Scene:
        view = self.view
        self.items.append(Line(tuple(self.at(*p) for p in view.outline), "gusset", closed=True))
        for torn in view.torn:
            points, edges = [self.at(*p) for p in torn], [self.at(*p) for p in view.outline]
            self.items += [Line(stroke, "hatch") for stroke in hatch(points, _HATCH, edges)]
        self._edges()
        for y, word in view.folds:
            left, _, right, _ = view.box
            self.items.append(Line((self.at(left, y), self.at(right, y)), "centre"))
            x, at = self.at(right, y)
            self.items.append(Text(x + 1.5, at + 0.3 * TEXT_HEIGHT, word))
        for piece in view.block:
            style: Style = "shear" if piece.kind == "shear" else "tension"
            self.items.append(Line((self.at(*piece.start), self.at(*piece.end)), style))
        if view.net:
            self.items.append(Line(tuple(self.at(*p) for p in view.net), "net"))
        self._holes()
        low = self._dimensions()
        low = self._legend(low + 3.0)
        title = Text(2.0, 5.2, view.title, bold=True)
        return Scene(SHEET, low + 2.0, (*self.items, title))

    def _edges(self) -> None:
        corners = [self.at(*p) for p in self.view.outline]
        for i, start in enumerate(corners):
            end = corners[(i + 1) % len(corners)]
            style: Style = "break" if i in self.view.cut else "member"
            if i in self.view.held:
                style = "weld"
                self.items += support_strokes(start, end, corners)
            self.items.append(Line((start, end), style))

    def _holes(self) -> None:
        marks: list[Text] = []
        for hole in self.view.holes:
            x, y = self.at(hole.x, hole.y)
            along, across = hole.along / 2 * self.scale, hole.across / 2 * self.scale
            if hole.along == hole.across:
                self.items.append(Circle(x, y, along, "bolt"))
            else:
                self.items.append(Curve(_slot(x, y, along, across), "bolt"))
            if not hole.bolt:
                d = 0.7071 * min(along, across)
                self.items.append(Line(((x - d, y - d), (x + d, y + d)), "break"))
                self.items.append(Line(((x - d, y + d), (x + d, y - d)), "break"))
            marks.append(self._mark(hole, x, y, max(along, across), marks))
        self.items += marks

    def _mark(self, hole: Opening, x: float, y: float, r: float, taken: Sequence[Text]) -> Text:
        """The hole's mark beside it, where it meets neither a hole nor another mark."""
        height, width = TEXT_HEIGHT, text_width(hole.mark)
        discs = [
            (*self.at(h.x, h.y), max(h.along, h.across) / 2 * self.scale) for h in self.view.holes
        ]
        places = []
        for out in (0.9, 3.0, 6.0, 10.0):
            d = r + out
            places += [
                Text(x + d, y - d + 0.3 * height, hole.mark),
                Text(x - d - width, y - d + 0.3 * height, hole.mark),
                Text(x + d, y + d + 0.4 * height, hole.mark),
                Text(x - d - width, y + d + 0.4 * height, hole.mark),
            ]
        for place in places:
            box = place.box()
            if any(_meet(box, other.box()) for other in taken):
                continue
            if any(_meet(box, (cx - q, cy - q, cx + q, cy + q)) for cx, cy, q in discs):
                continue
            return place
        return places[-4]

    def _dimensions(self) -> float:
        view = self.view
        low = self.bottom
        if len(view.along) > 1:
            stops = [self.at(x, 0.0)[0] for x in view.along]
            labels = [f"{b - a:.5g}" for a, b in pairwise(view.along)]
            chain = chain_x(self.bottom + 7.0, self.bottom, stops, labels)
            self.items.append(chain)
            low = self.bottom + (15.0 if chain.leaders else 9.0)
        if len(view.across) > 1:
            sizes = sorted(view.across, reverse=True)
            stops = [self.at(0.0, y)[1] for y in sizes]
            labels = [f"{a - b:.5g}" for a, b in pairwise(sizes)]
            self.items.append(chain_y(_LEFT - 8.0, _LEFT, stops, labels))
        return low

    def _legend(self, y: float) -> float:
        view = self.view
        rows: list[tuple[Style | None, str]] = []
        if view.net_label:
            rows.append(("net", view.net_label))
        kinds = {piece.kind for piece in view.block}
        if "shear" in kinds:
            rows.append(("shear", "block, in shear"))
        if "tension" in kinds:
            rows.append(("tension", "block, in tension"))
        rows += [("hatch", label) for label in view.block_labels]
        if view.held:
            rows.append((None, "edge with strokes: held by the support"))
        if any(not hole.bolt for hole in view.holes):
            rows.append((None, "crossed holes: no bolt"))
        rows += [(None, note) for note in view.notes]
        for style, word in rows:
            y += 1.35 * TEXT_HEIGHT
            middle = y - 0.32 * TEXT_HEIGHT
            if style == "hatch":
                box = [(6.0, middle - 2), (20.0, middle - 2), (20.0, middle + 2), (6.0, middle + 2)]
                self.items += [Line(stroke, "hatch") for stroke in hatch(box, _HATCH)]
            elif style is not None:
                self.items.append(Line(((6.0, middle), (20.0, middle)), style))
            self.items.append(Text(24.0, y, word))
        return y


def _meet(a: tuple[float, ...], b: tuple[float, ...]) -> bool:
    gap = 0.3
    return a[0] < b[2] + gap and b[0] < a[2] + gap and a[1] < b[3] + gap and b[1] < a[3] + gap


def _slot(x: float, y: float, along: float, across: float) -> tuple[tuple[float, ...], ...]:
    """A slot with round ends as the steps of a Curve."""
    if along >= across:
        r, d = across, along - across
        return (
            (x - d, y - r),
            (x + d, y - r),
            (x + d, y + r, r, 0.0),
            (x - d, y + r),
            (x - d, y - r, r, 0.0),
        )
    r, d = along, across - along
    return (
        (x + r, y - d),
        (x + r, y + d),
        (x - r, y + d, r, 0.0),
        (x - r, y - d),
        (x + r, y - d, r, 0.0),
    )


def hatch(
    polygon: Sequence[Point], spacing: float, within: Sequence[Point] = ()
) -> list[tuple[Point, Point]]:
    """Lines at 45 degrees inside a polygon, and inside another one where given, `spacing` apart."""
    step = spacing * 2.0**0.5
    sums = [x + y for x, y in polygon]
    strokes = []
    k = int(min(sums) // step) + 1
    while k * step < max(sums):
        c = k * step
        spans = _spans(polygon, c)
        if within:
            others = _spans(within, c)
            spans = [(max(a, u), min(b, v)) for a, b in spans for u, v in others]
        strokes += [((a, c - a), (b, c - b)) for a, b in spans if b > a]
        k += 1
    return strokes


def _spans(polygon: Sequence[Point], c: float) -> list[tuple[float, float]]:
    """Where the line x + y = c runs inside a polygon, by x."""
    met = []
    for (x1, y1), (x2, y2) in zip(polygon, [*polygon[1:], polygon[0]], strict=True):
        a, b = x1 + y1 - c, x2 + y2 - c
        if (a > 0) != (b > 0):
            met.append(x1 + a / (a - b) * (x2 - x1))
    met.sort()
    return [(met[i], met[i + 1]) for i in range(0, len(met) - 1, 2)]
