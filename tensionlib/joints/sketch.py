"""The to-scale sketch of a member's end on its gusset: an elevation and a section.

Model coordinates in mm: x along the force, from the member's end towards its body; y across the
force, from the element's reference edge (the heel of an angle) upwards.
"""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

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
from tensionlib.steel.outline import Arc, Corner, edges
from tensionlib.steel.outline import Circle as Round
from tensionlib.steel.sections import Section
from tensionlib.steel.shapes import outline

SHEET = 160.0
_LEFT = 26.0  # where the gusset's cut edge stands
_RIGHT = 84.0  # where the member's cut end stands
_ARROW = 15.0
_SECTION = 138.0  # middle of the section's place
_TOP = 17.0
_SECTION_WIDTH = 36.0


@dataclass(frozen=True)
class EndView:
    """What the sketch shows. Lengths in mm; `element` is what the end takes hold of.

    `rows` are the places of bolts along the force and `lines` across it, `holes` each hole's
    (x, y); `welds` the runs (x1, y1, x2, y2). `plate_end` is where the gusset's edge crosses the
    member, `plate_width` its width there. `net` is the drawn net section, empty for none.
    `forked` says that a plate like the gusset stands on the other side too, and `eye` is the width
    of an eye round the one hole, where it is wider than the member. `outline` is the gusset's own
    outline where it is stated, `supported` its held edges.
    """

    section: Section
    to: str
    element: str
    width: float
    thickness: float
    plate_thickness: float
    plate_end: float
    plate_width: float
    force: str
    notes: tuple[str, ...]
    holes: tuple[Point, ...] = ()
    hole: float = 0.0
    bolt: float = 0.0
    welds: tuple[tuple[float, float, float, float], ...] = ()
    leg_size: float = 0.0
    net: tuple[Point, ...] = ()
    along: tuple[tuple[float, ...], ...] = ()
    across: tuple[float, ...] = ()
    outline: tuple[Point, ...] = ()
    supported: tuple[int, ...] = ()
    forked: bool = False
    eye: float = 0.0


def _mm(length: float) -> str:
    return f"{length:.5g}"


def describe(view: EndView) -> str:
    """The sketch in words, for who cannot see it."""
    what = f"{view.section.designation} on a {_mm(view.plate_thickness)} mm gusset by its {view.to}"
    if view.holes:
        xs = sorted({round(x, 6) for x, _ in view.holes})
        detail = f"{len(view.holes)} holes of {_mm(view.hole)} mm"
        detail += ", along the force at " + ", ".join(_mm(x) for x in xs) + " mm from its end"
    else:
        runs = ", ".join(_mm(abs(x2 - x1) + abs(y2 - y1)) for x1, y1, x2, y2 in view.welds)
        detail = f"fillet welds of {_mm(view.leg_size)} mm leg, {runs} mm long"
    return f"End connection to scale: {what}; {detail}; {'; '.join(view.notes)}; {view.force}."


def sketch_end(view: EndView) -> Scene:
    """Elevation on the left, section on the right, one scale."""
    return _Sketch(view).scene()


class _Sketch:
    def __init__(self, view: EndView) -> None:
        self.view = view
        self.joint = max([view.plate_end, *(x for x, _ in view.holes)])
        self.back = max(55.0, 0.45 * view.width, *(12.0 - x for x, _ in view.outline))
        body = max(70.0, 0.7 * view.width)
        self.length = max([self.joint, *(x for x, _ in view.outline)]) + body
        profile = _profile(view)
        self.box = _extent(profile, view)
        self.profile = profile
        section_width = self.box[2] - self.box[0]
        ys = [y for _, y in view.outline]
        own = max(ys) - min(ys) if ys else view.plate_width
        tallest = max(own, view.width, self.box[3] - self.box[1])
        self.scale = min(
            (_RIGHT - _LEFT) / (self.back + self.length),
            62.0 / tallest,
            _SECTION_WIDTH / section_width,
        )
        # What stands above the reference edge at y = 0, in the elevation and the section.
        reach = 1.12 * view.plate_width / 2
        high, low = view.width / 2 + reach, view.width / 2 - reach
        if ys:
            high, low = max(ys), min(ys)
        self.above = max(high, view.width, self.box[3])
        self.below = max(-low, -self.box[1], 0.0)
        self.zero = _TOP + self.above * self.scale
        self.bottom = self.zero + self.below * self.scale
        self.left = _LEFT + self.back * self.scale
        self.right = self.left + self.length * self.scale
        self.items: list[Item] = []

    # Places on the sheet ------------------------------------------------------------------

    def _at(self, x: float, y: float) -> Point:
        return self.left + x * self.scale, self.zero - y * self.scale

    def _line(self, points: list[Point], style: Style, *, closed: bool = False) -> None:
        self.items.append(Line(tuple(self._at(x, y) for x, y in points), style, closed))

    # The drawing --------------------------------------------------------------------------

    def scene(self) -> Scene:
        view = self.view
        self._gusset()
        self._member()
        self._fasteners()
        if view.net:
            self._net()
        self._force()
        lowest = self._dimensions()
        self._section()
        lowest = max(lowest, self._notes())
        titles = [Text(2.0, 5.2, "Elevation", bold=True)]
        titles.append(Text(_SECTION, 5.2, "Section", "middle", bold=True))
        return Scene(SHEET, lowest + 2.5, (*self.items, *titles))

    def _gusset(self) -> None:
        view = self.view
        if view.outline:
            self._line(list(view.outline), "gusset", closed=True)
            for i in view.supported:
                self._support(view.outline[i], view.outline[(i + 1) % len(view.outline)])
            return
        middle, half = view.width / 2, view.plate_width / 2
        wide = half * 1.12
        x = view.plate_end
        left = -self.back
        self._line(
            [(left, middle - wide), (x, middle - half), (x, middle + half), (left, middle + wide)],
            "gusset",
            closed=True,
        )
        self._break(left, middle - wide, middle + wide)

    def _support(self, start: Point, end: Point) -> None:
        """A supported edge: a heavy line with short strokes on the support's side."""
        self._line([start, end], "weld")
        outline = [self._at(x, y) for x, y in self.view.outline]
        self.items += support_strokes(self._at(*start), self._at(*end), outline)

    def _break(self, x: float, low: float, high: float) -> None:
        """A cut edge: a line with a zigzag in its middle."""
        mid, step = (low + high) / 2, (high - low) / 12
        zig = 0.6 * step
        self._line(
            [
                (x, low - step),
                (x, mid - step),
                (x - zig, mid - step / 2),
                (x + zig, mid + step / 2),
                (x, mid + step),
                (x, high + step),
            ],
            "break",
        )

    def _member(self) -> None:
        view = self.view
        b, end = view.width, self.length
        if view.eye > b:
            # The eye is as wide as stated over its hole, then runs in to the member.
            (at, _), out = view.holes[0], (view.eye - b) / 2
            back = at + view.eye / 2
            corners = [(0.0, -out), (back, -out), (back + 2 * out, 0.0), (end, 0.0), (end, b)]
            corners += [(back + 2 * out, b), (back, b + out), (0.0, b + out)]
            self._line(corners, "member", closed=True)
        else:
            self._line([(0.0, 0.0), (end, 0.0), (end, b), (0.0, b)], "member", closed=True)
        for y in _inner_edges(view):
            self._line([(0.0, y), (end, y)], "break")
        if view.to in ("slot", "bar", "rod"):
            # The gusset in the slot, or the bar in the gusset's: seen through.
            self._line([(0.0, b / 2), (end, b / 2)], "centre")
        else:
            half = min(view.plate_width / 2, b / 2) if not view.outline else 0.0
            x = view.plate_end
            self._line([(x, b / 2 - half), (x, b / 2 + half)], "hidden")
        self._break(end, 0.0, b)

    def _fasteners(self) -> None:
        view = self.view
        for x, y in view.holes:
            px, py = self._at(x, y)
            r = view.hole / 2 * self.scale
            self.items.append(Circle(px, py, r, "bolt"))
            arm = 1.5 * r
            self.items.append(Line(((px - arm, py), (px + arm, py)), "centre"))
            self.items.append(Line(((px, py - arm), (px, py + arm)), "centre"))
        for x1, y1, x2, y2 in view.welds:
            self._line([(x1, y1), (x2, y2)], "weld")
            self._ticks(self._at(x1, y1), self._at(x2, y2))

    def _ticks(self, start: Point, end: Point) -> None:
        """Short strokes along a run of weld, towards the outside of the member."""
        (x1, y1), (x2, y2) = start, end
        length = abs(x2 - x1) + abs(y2 - y1)
        count = max(int(length / 1.6), 2)
        across = x1 == x2
        middle = self._at(0.0, self.view.width / 2)[1]
        for i in range(count + 1):
            f = i / count
            x, y = x1 + f * (x2 - x1), y1 + f * (y2 - y1)
            tip = (x - 1.5, y) if across else (x, y - 1.5 if y1 < middle else y + 1.5)
            self.items.append(Line(((x, y), tip), "break"))

    def _net(self) -> None:
        points = [self._at(x, y) for x, y in self.view.net]
        self.items.append(Line(tuple(points), "net"))
        x, y = points[-1]
        middle, half = self.view.width / 2, self.view.plate_width / 2
        top = min(self._at(0.0, middle + 1.12 * half)[1], y)
        if self.view.outline:
            top = min(self._at(0.0, max(v for _, v in self.view.outline))[1], y)
        self.items.append(Line(((x, y), (x, top - 0.8)), "net"))
        reach = text_width("net section") / 2
        self.items.append(Text(max(x, _LEFT + reach), top - 2.4, "net section", "middle"))

    def _force(self) -> None:
        y = self._at(0.0, self._line_of_force())[1]
        start, tip = self.right + 1.5, self.right + 1.5 + _ARROW
        self.items.append(Line(((start, y), (tip - 4.0, y)), "force"))
        head = ((tip, y), (tip - 4.6, y - 1.5), (tip - 4.6, y + 1.5))
        self.items.append(Line(head, "force", closed=True))
        self.items.append(Text(start + 0.5, y - 3.2, self.view.force))

    def _line_of_force(self) -> float:
        view = self.view
        if view.holes:
            ys = [y for _, y in view.holes]
            return (min(ys) + max(ys)) / 2
        return view.width / 2

    def _dimensions(self) -> float:
        """Chains below, above and to the left; gives how far down the sheet they reach."""
        view = self.view
        at = self.bottom + 7.0
        reach = self._at(0.0, 0.0)[1]
        for stops in view.along:
            places = [self._at(x, 0.0)[0] for x in stops]
            chain = chain_x(at, reach, places, _chain_labels(stops))
            self.items.append(chain)
            at += 15.0 if chain.leaders else 9.0
        if view.across:
            stops_y = sorted(self._at(0.0, y)[1] for y in view.across)
            sizes = sorted(view.across, reverse=True)
            labels = [_mm(a - b) for a, b in pairwise(sizes)]
            x = self._at(-self.back, 0.0)[0]
            self.items.append(chain_y(x - 5.0, self._at(0.0, 0.0)[0], stops_y, labels))
        return at - 3.0

    # The section --------------------------------------------------------------------------

    def _section(self) -> None:
        left, _, right, _ = self.box
        centre = (left + right) / 2

        def at(x: float, y: float) -> Point:
            return _SECTION + (x - centre) * self.scale, self.zero - y * self.scale

        plates: list[Item] = [
            Line((at(x1, y1), at(x2, y1), at(x2, y2), at(x1, y2)), "gusset", closed=True)
            for x1, y1, x2, y2 in _plates(self.view, self.box)
        ]
        profile = [_curve(loop, at, style) for loop, style in self.profile]
        # A gusset in a tube's slots stands before the tube.
        self.items += [*profile, *plates] if self.view.to == "slot" else [*plates, *profile]
        held = [] if self.view.to == "rod" else self.view.holes
        for y in sorted({y for _, y in held}):
            for x1, x2 in _grips(self.view):
                out = 0.55 * self.view.bolt
                self.items.append(Line((at(x1 - out, y), at(x2 + out, y)), "centre"))
                half = self.view.bolt / 2
                shank = (at(x1, y - half), at(x2, y - half), at(x2, y + half), at(x1, y + half))
                self.items.append(Line(shank, "bolt", closed=True))

    def _notes(self) -> float:
        """The words below the section; gives how far down they reach."""
        y = self.bottom + 4.5 + TEXT_HEIGHT
        for note in self.view.notes:
            self.items.append(Text(_SECTION, y, note, "middle"))
            y += 1.3 * TEXT_HEIGHT
        return y - 0.9 * TEXT_HEIGHT


def _chain_labels(stops: tuple[float, ...]) -> list[str]:
    return [_mm(b - a) for a, b in pairwise(stops)]


# Shapes in their places ---------------------------------------------------------------------

Ring = tuple[Corner, ...] | Round


def _single(section: Section) -> str:
    return section.shape.removeprefix("double ")


def _profile(view: EndView) -> list[tuple[Ring, Style]]:
    """The section's loops, turned so that the element's face stands at x = 0 and y runs across."""
    section = view.section
    if section.shape == "stated":
        half = view.thickness
        box = (Corner(0, 0), Corner(half, 0), Corner(half, view.width), Corner(0, view.width))
        return [(box, "member")]
    shape = outline(_single(section), section.dims)
    loops: list[tuple[Ring, Style]] = [(shape.outer, "member")]
    loops += [(hole, "bolt") for hole in shape.holes]
    turned = [(_turned(loop, view), style) for loop, style in loops]
    if section.shape.startswith("double"):
        gap = view.plate_thickness
        turned += [(_mirrored(loop, -gap), style) for loop, style in turned]
    return turned


def _turned(loop: Ring, view: EndView) -> Ring:
    d, shape = view.section.dims, _single(view.section)
    if isinstance(loop, Round):
        return Round(0.0, view.width / 2, loop.r)
    if shape == "angle" and view.element == "short leg":
        return tuple(Corner(c.y, c.x, c.r) for c in reversed(loop))
    if shape == "tee" and view.element == "flange":
        return tuple(Corner(d["d"] - c.y, c.x + d["b_f"] / 2, c.r) for c in loop[::-1])
    if shape in ("I", "channel") and view.element == "flange":
        shift = d["b_f"] / 2 if shape == "I" else 0.0
        return tuple(Corner(c.y, c.x + shift, c.r) for c in reversed(loop))
    if shape in ("I", "tee"):
        return tuple(Corner(c.x + d["t_w"] / 2, c.y, c.r) for c in loop)
    if shape == "flat":
        return tuple(Corner(c.y + d["t"] / 2, c.x + d["b"] / 2, c.r) for c in reversed(loop))
    if shape == "RHS":
        return tuple(Corner(c.x, c.y + d["d"] / 2, c.r) for c in loop)
    return loop


def _mirrored(loop: Ring, x: float) -> Ring:
    """The loop mirrored about the middle of a gap that runs from x to 0."""
    assert not isinstance(loop, Round)
    return tuple(Corner(x - c.x, c.y, c.r) for c in reversed(loop))


def _curve(loop: Ring, at: object, style: Style) -> Item:
    place = at
    assert callable(place)
    if isinstance(loop, Round):
        x, y = place(loop.cx, loop.cy)
        edge, _ = place(loop.cx + loop.r, loop.cy)
        return Circle(x, y, edge - x, style)
    steps: list[tuple[float, ...]] = []
    unit = place(1.0, 0.0)[0] - place(0.0, 0.0)[0]
    for edge_ in edges(loop):
        if isinstance(edge_, Arc):
            if not steps:
                steps.append(place(edge_.x1, edge_.y1))
            # y runs up in the model and down on the sheet, which turns left into right.
            steps.append((*place(edge_.x2, edge_.y2), edge_.r * unit, float(edge_.sweep > 0)))
        else:
            if not steps:
                steps.append(place(edge_[0], edge_[1]))
            steps.append(place(edge_[2], edge_[3]))
    return Curve(tuple(steps), style)


def _plates(
    view: EndView, box: tuple[float, float, float, float]
) -> list[tuple[float, float, float, float]]:
    """The gussets of the section as rectangles (x1, y1, x2, y2)."""
    t, b = view.plate_thickness, view.width
    low, high = box[1], box[3]
    if view.to in ("slot", "rod"):
        return [(-t / 2, low, t / 2, high)]
    if view.to == "bar":
        return [(-t / 2, low, t / 2, 0.0), (-t / 2, b, t / 2, high)]
    plates = [(-t, low, 0.0, high)]
    if view.to == "both flanges":
        d = view.section.dims["d"]
        plates.append((d, low, d + t, high))
    if view.forked:
        plates.append((view.thickness, low, view.thickness + t, high))
    return plates


def _grips(view: EndView) -> list[tuple[float, float]]:
    """Where each bolt passes through plies in the section: (x1, x2)."""
    t, tp = view.thickness, view.plate_thickness
    if view.to == "both flanges":
        d = view.section.dims["d"]
        return [(-tp, t), (d - t, d + tp)]
    if view.forked:
        return [(-tp, t + tp)]
    if view.section.shape.startswith("double"):
        return [(-tp - t, t)]
    return [(-tp, t)]


def _extent(profile: list[tuple[Ring, Style]], view: EndView) -> tuple[float, float, float, float]:
    """Left, bottom, right, top of the section with its gussets."""
    xs: list[float] = []
    ys: list[float] = []
    for loop, _ in profile:
        if isinstance(loop, Round):
            xs += [loop.cx - loop.r, loop.cx + loop.r]
            ys += [loop.cy - loop.r, loop.cy + loop.r]
        else:
            xs += [c.x for c in loop]
            ys += [c.y for c in loop]
    t = view.plate_thickness
    xs.append(-t)
    if view.to in ("slot", "bar", "rod"):
        xs += [-t / 2, t / 2]
    if view.to == "both flanges":
        xs.append(view.section.dims["d"] + t)
    if view.forked:
        xs.append(view.thickness + t)
    over = max(12.0, 0.12 * view.width)
    return min(xs), min(ys) - over, max(xs), max(ys) + over


def _inner_edges(view: EndView) -> list[float]:
    """Edges seen inside the element's outline in the elevation, across the force."""
    d, shape = view.section.dims, _single(view.section)
    if shape == "angle":
        return [d["t"]]
    if shape == "channel" and view.element == "web":
        return [d["t_f"], d["d"] - d["t_f"]]
    if shape == "channel":
        return [d["t_w"]]
    if shape in ("I", "tee") and view.element == "flange":
        return [(view.width - d["t_w"]) / 2, (view.width + d["t_w"]) / 2]
    if shape == "I":
        return [d["t_f"], d["d"] - d["t_f"]]
    if shape == "tee":
        return [d["d"] - d["t_f"]]
    if shape == "RHS":
        return [d["t"], view.width - d["t"]]
    return []
