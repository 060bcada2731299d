"""The parts of a pattern end by themselves: sections opened flat, gussets, cover plates."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence

from tensionlib.joints.blocks import Block
from tensionlib.joints.gusset_shape import GussetPart
from tensionlib.joints.opened import OpenedSheet
from tensionlib.joints.part_view import PartView, Segment
from tensionlib.joints.parts import Opening, Part
from tensionlib.joints.paths import Hop
from tensionlib.joints.scene import Point
from tensionlib.joints.stated import in_mm
from tensionlib.members.pattern import Grip, PatternGeometry

Place = Callable[[float, float], Point]


def part_views(shape: PatternGeometry) -> list[PartView]:
    """Every sheet of the section that has holes, then the gusset or a cover plate at each grip."""
    views = [_sheet_view(shape, sheet, hops.hops) for sheet, hops in shape.chains]
    return views + [_plate_view(shape, grip) for grip in shape.grips]


def _net(hops: Sequence[Hop], low: float, high: float) -> tuple[Point, ...]:
    """The chain from edge to edge, straight across outside its first and last hole."""
    points = [(hop.hole.x, hop.hole.y) for hop in hops]
    return ((points[0][0], low), *points, (points[-1][0], high))


def _label(hops: Sequence[Hop]) -> str:
    marks = [hop.hole.mark for hop in hops]
    return f"net section, hole{'s' if len(marks) > 1 else ''} " + " – ".join(marks)


def _torn(
    block: Block | None, part: Part, place: Place
) -> tuple[tuple[Segment, ...], tuple[tuple[Point, ...], ...], str]:
    """Pieces, torn-out areas and label of a block, put in place."""
    if block is None:
        return (), (), ""
    pieces = tuple(Segment(p.kind, place(p.x_1, p.y_1), place(p.x_2, p.y_2)) for p in block.pieces)
    areas = tuple(tuple(place(x, y) for x, y in area) for area in block.outlines(part))

    def total(kind: str) -> str:
        return f"{sum(p.gross for p in block.pieces if p.kind == kind):.5g}"

    label = f"block: shear {total('shear')} mm, tension {total('tension')} mm"
    return pieces, areas, label


def _sheet_view(shape: PatternGeometry, sheet: OpenedSheet, hops: Sequence[Hop]) -> PartView:
    holes = shape.on_sheet(sheet)
    far = max(hole.x for hole in holes) + 60.0
    width = sheet.part.width
    pieces: tuple[Segment, ...] = ()
    areas: tuple[tuple[Point, ...], ...] = ()
    labels: list[str] = []
    for grip in shape.grips:
        if grip.element in sheet.places:

            def place(x: float, y: float, element: str = grip.element) -> Point:
                return x, sheet.across(element, y)

            more, torn, label = _torn(shape.member_block(grip), grip.part, place)
            pieces, areas = pieces + more, areas + torn
            labels += [label + grip.where] if label else []
    xs = sorted({hole.x for hole in holes})
    ys = sorted({hole.y for hole in holes})
    return PartView(
        title=f"Member: {sheet.title}, {shape.section.designation.partition(',')[0]}",
        outline=((0.0, 0.0), (far, 0.0), (far, width), (0.0, width)),
        cut=(1,),
        folds=sheet.folds,
        holes=holes,
        net=_net(hops, 0.0, width),
        net_label=_label(hops),
        block=pieces,
        torn=areas,
        block_labels=tuple(labels),
        along=(0.0, *xs),
        across=(0.0, *ys, width),
    )


def _plate_view(shape: PatternGeometry, grip: Grip) -> PartView:
    """A gusset with its own outline, or as much of a plate as the joint needs."""
    end = shape.end
    block = shape.plate_block(grip)
    chain = shape.plate_chain(grip)
    title = ("Cover plate" if shape.spliced else "Gusset") + grip.where
    title += f", {in_mm(end.plate.thickness):g} mm"
    part = grip.plate
    if isinstance(part, GussetPart):
        own = part

        def back(x: float, y: float) -> Point:
            return own.u_0 - x, y + own.shape.across[0]

        outline = own.shape.outline
        cut: tuple[int, ...] = ()
        lengths = ", ".join(f"{math.dist(*own.shape.edge(i)):.4g}" for i in range(len(outline)))
        notes: tuple[str, ...] = (f"edges in turn: {lengths} mm",)
    else:
        bolts = grip.plate_holes
        side = shape.plate_side(grip.bolts)
        room = 60.0 if side is None else side
        low = min(b.y for b in bolts) - room
        high = max(b.y for b in bolts) + room
        far = max(b.x for b in bolts) + 60.0

        def back(x: float, y: float) -> Point:
            return far - x, y - low

        outline = ((0.0, 0.0), (far, 0.0), (far, high - low), (0.0, high - low))
        cut = (0, 2, 3) if side is None else (3,)
        notes = ()
    holes = tuple(Opening(b.mark, *back(b.x, b.y), b.across, b.along) for b in grip.plate_holes)
    pieces, areas, label = _torn(block, part, back)
    low_y, high_y = min(y for _, y in outline), max(y for _, y in outline)
    net_holes = [hop.hole for hop in chain.hops]
    points = [back(h.x, h.y) for h in net_holes]
    spread = grip.spread
    middle = sum(h.y for h in holes) / len(holes)
    centre = sum(b.y for b in grip.bolts) / len(grip.bolts)
    # The net section of a gusset runs over the width that counts.
    low_net = max(low_y, min(points[0][1], middle + spread.low - centre))
    high_net = min(high_y, max(points[-1][1], middle + spread.high - centre))
    xs = sorted({hole.x for hole in holes})
    ys = sorted({hole.y for hole in holes})
    right = max(x for x, _ in outline)
    rectangle = not isinstance(part, GussetPart)
    return PartView(
        title=title,
        outline=outline,
        cut=cut,
        holes=holes,
        net=((points[0][0], low_net), *points, (points[-1][0], high_net)),
        net_label=_label(chain.hops) + ", on the width that counts",
        block=pieces,
        torn=areas,
        block_labels=(label,) if label else (),
        along=(*xs, right) if rectangle else tuple(xs),
        across=(low_y, *ys, high_y) if rectangle and 0 not in cut else tuple(ys),
        held=tuple(part.shape.supported) if isinstance(part, GussetPart) else (),
        notes=notes,
    )
