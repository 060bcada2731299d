"""From a member's ends to their sketches."""

from __future__ import annotations

from dataclasses import replace

from tensionlib.calculation.result import Sketch
from tensionlib.joints.ends import Bolted, Welded
from tensionlib.joints.part_view import PartView, describe_part, part_scene
from tensionlib.joints.pattern_end import BoltedPattern
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.sketch import EndView, describe, sketch_end
from tensionlib.joints.stated import in_mm
from tensionlib.joints.svg import to_svg
from tensionlib.joints.welded_runs import WeldedRuns
from tensionlib.members.geometry import Seat, seat
from tensionlib.members.member import End, Member
from tensionlib.members.part_views import part_views
from tensionlib.members.pattern import PatternGeometry
from tensionlib.quantities import LENGTH, quantity
from tensionlib.standards import Standard
from tensionlib.steel import Section, bolt

_SPREAD = 2 * 0.5773502691896257  # both sides of the force at 30°: twice the tangent


def sketches(
    member: Member, standard: Standard, force: str, holes: tuple[float, ...]
) -> tuple[Sketch, ...]:
    """One sketch for each distinct end, and the parts of one with any pattern of holes.

    `force` labels the force arrow; `holes` are the hole diameters of the ends in mm, 0 for a
    welded one.
    """
    ends = member.ends
    found = []
    for i, (end, hole) in enumerate(zip(ends, holes, strict=True), start=1):
        view = end_view(member.profile, end, force, hole)
        title = "End connection, both ends" if len(ends) == 1 else f"End {i}"
        found.append(Sketch(title, to_svg(sketch_end(view)), describe(view)))
        for part in views_of(member, end, standard):
            scene = part_scene(part)
            found.append(Sketch(part.title, to_svg(scene), describe_part(part)))
    return tuple(found)


def views_of(member: Member, end: End, standard: Standard) -> list[PartView]:
    """The parts of an end by themselves; none but for an end with any pattern of holes."""
    if not isinstance(end, BoltedPattern):
        return []
    return part_views(PatternGeometry(member.profile, member.material, end, standard))


def end_view(section: Section, end: End, force: str, hole: float) -> EndView:
    """What the sketch of an end shows; `hole` is the hole diameter, 0 for a welded end."""
    place = seat(section, end)
    if isinstance(end, Bolted):
        view = _bolted(section, end, place, force, hole)
    elif isinstance(end, BoltedPattern):
        view = _pattern(section, end, place, force, hole)
    elif isinstance(end, WeldedRuns):
        view = _runs(section, end, place, force)
    elif isinstance(end, Pinned):
        return _pinned(section, end, place, force)
    elif isinstance(end, Threaded):
        return _rod(section, end, place, force)
    else:
        view = _welded(section, end, place, force)
    shape = end.plate.shape
    if shape is None:
        return view
    ys = [y for _, y in view.holes] or [0.0, place.width]
    middle = sum(ys) / len(ys)
    return replace(
        view,
        # The gusset's own edge is drawn, not dimensioned at the joint.
        along=tuple(stops[:-1] if view.holes else stops for stops in view.along),
        plate_end=0.0,
        outline=tuple((u, v + middle) for u, v in shape.outline),
        supported=tuple(shape.supported),
    )


def _plate_width(end: End, lines_apart: float, joint: float, width: float) -> float:
    """The gusset's stated width, or one that looks the part: wider than what it takes hold of."""
    if end.plate.width is not None:
        return in_mm(end.plate.width)
    return max(1.15 * width, lines_apart + _SPREAD * joint)


def _bolted(section: Section, end: Bolted, place: Seat, force: str, hole: float) -> EndView:
    fastener = bolt(end.bolts)
    pitch, first = in_mm(end.pitch), in_mm(end.end_distance)
    apart = in_mm(end.line_spacing) if end.lines == 2 else 0.0
    stagger = in_mm(end.stagger)
    if place.lines_from == "heel":
        lines = [in_mm(end.gauge), in_mm(end.gauge) + apart]
    else:
        lines = [(place.width - apart) / 2, (place.width + apart) / 2]
    lines = lines[: end.lines]
    holes = tuple(
        (first + i * pitch + (stagger if j else 0.0), y)
        for j, y in enumerate(lines)
        for i in range(end.per_line)
    )
    xs = sorted({x for x, _ in holes})
    last = xs[-1]
    edge = last + in_mm(
        end.plate_end_distance if end.plate_end_distance is not None else end.end_distance
    )
    net = tuple((max(x for x, y in holes if y == line), line) for line in lines)
    bottom, top = (net[0][0], 0.0), (net[-1][0], place.width)
    count = f"{len(holes) * place.gussets} {end.bolts}"
    return EndView(
        section=section,
        to=end.to,
        element=place.element,
        width=place.width,
        thickness=place.thickness,
        plate_thickness=in_mm(end.plate.thickness),
        plate_end=edge,
        plate_width=_plate_width(end, apart, last - first, place.width),
        force=force,
        notes=(
            section.designation.partition(",")[0],
            f"gusset {in_mm(end.plate.thickness):g} mm",
            count,
            f"holes {hole:g} mm",
        ),
        holes=holes,
        hole=hole,
        bolt=fastener.d_f,
        net=(bottom, *net, top),
        along=((0.0, *xs, edge),),
        across=tuple(dict.fromkeys((0.0, *lines, place.width))),
    )


def _pattern(section: Section, end: BoltedPattern, place: Seat, force: str, hole: float) -> EndView:
    """The holes of the element on the gusset; other elements have part views of their own."""
    fastener = bolt(end.bolts)
    shown = [h for h in end.holes.holes if end.at_gusset(h.element)]
    holes = tuple((in_mm(h.x), in_mm(h.y)) for h in shown)
    xs = sorted({round(x, 6) for x, _ in holes})
    ys = sorted({round(y, 6) for _, y in holes})
    stated = end.plate_end_distance
    edge = xs[-1] + (xs[0] if stated is None else in_mm(stated))
    count = f"{sum(h.bolt for h in end.holes.holes)} {end.bolts}"
    return EndView(
        section=section,
        to=end.to,
        element=place.element,
        width=place.width,
        thickness=place.thickness,
        plate_thickness=in_mm(end.plate.thickness),
        plate_end=edge,
        plate_width=_plate_width(end, ys[-1] - ys[0], xs[-1] - xs[0], place.width),
        force=force,
        notes=(
            section.designation.partition(",")[0],
            f"gusset {in_mm(end.plate.thickness):g} mm",
            count,
            f"holes {hole:g} mm",
        ),
        holes=holes,
        hole=hole,
        bolt=fastener.d_f,
        along=((0.0, *xs, edge),),
        across=tuple(dict.fromkeys((0.0, *ys, place.width))),
    )


def _welded(section: Section, end: Welded, place: Seat, force: str) -> EndView:
    l_1, l_2, b = in_mm(end.length_1), in_mm(end.length_2), place.width
    welds = [(0.0, 0.0, l_1, 0.0), (0.0, b, l_2, b)]
    if end.transverse is not None:
        welds.append((0.0, 0.0, 0.0, min(in_mm(end.transverse), b)))
    runs = ("on both faces",) if end.to in ("slot", "bar") else ()
    along = ((0.0, l_1),) if l_1 == l_2 else ((0.0, l_1), (0.0, l_2))
    return EndView(
        section=section,
        to=end.to,
        element=place.element,
        width=b,
        thickness=place.thickness,
        plate_thickness=in_mm(end.plate.thickness),
        plate_end=max(l_1, l_2) + 10.0,
        plate_width=_plate_width(end, b, min(l_1, l_2), b),
        force=force,
        notes=(
            section.designation.partition(",")[0],
            f"gusset {in_mm(end.plate.thickness):g} mm",
            f"{in_mm(end.leg_size):g} mm fillets",
            *runs,
            f"{end.quality}, {end.metal}",
        ),
        welds=tuple(welds),
        leg_size=in_mm(end.leg_size),
        along=along,
        across=(0.0, b),
    )


def _runs(section: Section, end: WeldedRuns, place: Seat, force: str) -> EndView:
    runs = [run.as_run() for run in end.runs]
    b = place.width
    far = max(max(run.x_1, run.x_2) for run in runs)
    legs = sorted({run.leg for run in runs})
    return EndView(
        section=section,
        to=end.to,
        element=place.element,
        width=b,
        thickness=place.thickness,
        plate_thickness=in_mm(end.plate.thickness),
        plate_end=far + 10.0,
        plate_width=_plate_width(end, b, far, b),
        force=force,
        notes=(
            section.designation.partition(",")[0],
            f"gusset {in_mm(end.plate.thickness):g} mm",
            " and ".join(f"{leg:g}" for leg in legs) + " mm fillets",
            f"{end.quality}, {end.metal}",
        ),
        welds=tuple((run.x_1, run.y_1, run.x_2, run.y_2) for run in runs),
        leg_size=legs[0],
        along=tuple((0.0, run.length) for run in runs if run.angle < 0.1),
        across=(0.0, b),
    )


def _pinned(section: Section, end: Pinned, place: Seat, force: str) -> EndView:
    """The eye on its pin; the fork plates are shown as the gusset."""
    at = in_mm(end.edge_beyond)
    edge = at + in_mm(end.plate_edge_beyond)
    middle, eye = place.width / 2, end.eye(quantity(place.width, LENGTH))
    return EndView(
        section=section,
        to="plate",
        element=place.element,
        width=place.width,
        thickness=place.thickness,
        plate_thickness=in_mm(end.plate.thickness),
        plate_end=edge,
        plate_width=in_mm(end.plate.width),
        force=force,
        notes=(
            section.designation.partition(",")[0],
            f"2 fork plates {in_mm(end.plate.thickness):g} mm",
            f"pin {in_mm(end.pin):g} mm",
            f"hole {in_mm(end.hole):g} mm",
        ),
        holes=((at, middle),),
        hole=in_mm(end.hole),
        bolt=in_mm(end.pin),
        net=((at, middle - eye / 2), (at, middle), (at, middle + eye / 2)),
        along=((0.0, at, edge),),
        across=(0.0, middle, place.width),
        forked=True,
        eye=eye,
    )


def _rod(section: Section, end: Threaded, place: Seat, force: str) -> EndView:
    """The lug with the fork's pin; the bought fork itself is not drawn."""
    d, beyond, lug = place.width, in_mm(end.plate_edge_beyond), in_mm(end.plate.width)
    # The fork stands between the lug and the rod's end; a bought part, it is left out.
    at, low, high = -beyond - 1.5 * d, (d - lug) / 2, (d + lug) / 2
    left = at - 1.2 * lug
    coupling = () if end.coupling == "none" else (end.coupling,)
    return EndView(
        section=section,
        to="rod",
        element=place.element,
        width=d,
        thickness=place.thickness,
        plate_thickness=in_mm(end.plate.thickness),
        plate_end=0.0,
        plate_width=lug,
        force=force,
        notes=(
            f"{section.designation.partition(',')[0]}, thread {end.thread}",
            f"lug {in_mm(end.plate.thickness):g} mm",
            f"fork's pin {in_mm(end.pin):g} mm",
            *coupling,
            "fork not drawn",
        ),
        holes=((at, d / 2),),
        hole=in_mm(end.hole),
        bolt=in_mm(end.pin),
        along=((at, at + beyond),),
        across=(low, d / 2, high),
        outline=((left, low), (at + beyond, low), (at + beyond, high), (left, high)),
    )
