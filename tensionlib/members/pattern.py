"""From an end with any pattern of holes to what its walk is given.

The search happens here: chains across the section opened flat, tear-out blocks, the bolt that
tears out first. What it chose goes on as inputs, with its measure and the reason in words.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace
from functools import cached_property
from itertools import combinations

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.errors import InputError
from tensionlib.joints.blocks import Block, Piece, least_block
from tensionlib.joints.bolt_group import (
    BoltGroup,
    clear_distance,
    elastic_shares,
    most_loaded,
    worst_tear_out,
)
from tensionlib.joints.gusset_shape import GussetPart
from tensionlib.joints.holes import Hole
from tensionlib.joints.opened import Opened, OpenedSheet, element_part, opened
from tensionlib.joints.parts import Flat, Opening, Part, check_holes
from tensionlib.joints.paths import Hop, NetPath, least_path
from tensionlib.joints.pattern_end import BoltedPattern, Covers
from tensionlib.joints.stated import in_mm
from tensionlib.joints.welded_runs import member_line
from tensionlib.members.geometry import Seat, seat, thickest
from tensionlib.standards import Standard
from tensionlib.steel import Bolt, Grade, Section, bolt, grade

_TAN_30 = math.tan(math.pi / 6)
_FOUND = "found by the search"
_COUNTED = "from the pattern"
_WIDE = 1e4  # mm: a gusset whose side edges are not stated


@dataclass(frozen=True)
class Spread:
    """From where to where the force spreads in the gusset, mm across and along."""

    low: float
    high: float
    apart: float
    reach_low: float
    reach_high: float


@dataclass(frozen=True)
class Grip:
    """One element with bolts: its part and holes, the gusset's part and holes, in mm."""

    element: str
    where: str
    part: Flat
    holes: tuple[Opening, ...]
    plate: Part
    plate_holes: tuple[Opening, ...]
    spread: Spread

    @property
    def bolts(self) -> tuple[Opening, ...]:
        return tuple(hole for hole in self.holes if hole.bolt)


class PatternGeometry:
    """The pattern of one end, laid out: holes with their sizes, sheets, grips, shares.

    Raises
    ------
    InputError
        For an element the section does not have, or holes that overlap or leave their part.
    """

    def __init__(
        self, section: Section, steel: Grade, end: BoltedPattern, standard: Standard
    ) -> None:
        self.section = section
        steel = steel.made_as(section.shape)
        t_y = thickest(self.section)
        self.strengths = steel.f_y(t_y), steel.f_u(t_y)
        self.end = end
        self.place: Seat = seat(self.section, end)
        self.fastener: Bolt = bolt(end.bolts)
        self.opened: Opened = opened(self.section)
        self._sizes, self._forms = standard.hole_size, standard.block_forms
        self.elements: dict[str, list[Opening]] = {}
        for hole in end.holes.holes:
            element = self._element(hole)
            self.elements.setdefault(element, []).append(self._opening(hole))
        for sheet in self.opened.sheets:
            if on_it := self.on_sheet(sheet):
                check_holes(sheet.part, on_it)
        for element, holes in self.elements.items():
            self._check_backs(element, holes)

    def _element(self, hole: Hole) -> str:
        name = hole.element or self.end.to
        equal = "leg" in self.opened.elements
        if equal:
            name = {"long leg": "leg", "short leg": "other leg"}.get(name, name)
        if name not in self.opened.elements:
            raise InputError(
                f"hole {hole.mark}: element {name!r}; {self.section.designation} has"
                f" {', '.join(map(repr, self.opened.elements))}"
            )
        return name

    def _opening(self, hole: Hole) -> Opening:
        d_f = self.fastener.d_f
        width, length = self._sizes(d_f, hole.kind)
        if hole.diameter is not None:
            width = length = in_mm(hole.diameter)
            if width <= d_f and hole.bolt:
                raise InputError(
                    f"hole {hole.mark}: diameter {width:g} mm; more than the bolt's {d_f:g} mm is"
                    " due"
                )
        if hole.slot == "across":
            width, length = length, width
        return Opening(hole.mark, in_mm(hole.x), in_mm(hole.y), width, length, hole.bolt)

    def hole_size(self, kind: str) -> tuple[float, float]:
        """Width and length of a hole of a kind for this end's bolts, mm."""
        return self._sizes(self.fastener.d_f, kind)

    def _check_backs(self, element: str, holes: Sequence[Opening]) -> None:
        """Refuse holes that run into the plate that stands on this one."""
        d = self.section.dims
        name = element.removesuffix(" 1").removesuffix(" 2")
        shape = self.section.shape.removeprefix("double ")
        for hole in holes:
            low, high = hole.y - hole.across / 2, hole.y + hole.across / 2
            where = f"hole {hole.mark!r} in the {element}, {hole.y:g} mm across"
            if shape == "angle" and low <= d["t"]:
                raise InputError(f"{where}: it runs into the other leg, {d['t']:g} mm thick")
            if shape == "channel" and name == "flange" and low <= d["t_w"]:
                raise InputError(f"{where}: it runs into the web, {d['t_w']:g} mm thick")
            if name == "web" and (
                (shape != "tee" and low <= d["t_f"]) or high >= d["d"] - d["t_f"]
            ):
                raise InputError(f"{where}: it runs into a flange, {d['t_f']:g} mm thick")
            if shape in ("I", "tee") and name == "flange":
                middle, half = d["b_f"] / 2, d["t_w"] / 2
                if low < middle + half and high > middle - half:
                    raise InputError(f"{where}: it runs into the web, {d['t_w']:g} mm thick")

    # The section opened flat --------------------------------------------------------------

    def on_sheet(self, sheet: OpenedSheet) -> tuple[Opening, ...]:
        """The holes of a sheet, in its own axes."""
        return tuple(
            replace(hole, y=sheet.across(element, hole.y))
            for element, holes in self.elements.items()
            if element in sheet.places
            for hole in holes
        )

    @cached_property
    def chains(self) -> tuple[tuple[OpenedSheet, NetPath], ...]:
        """The chain that governs on each sheet with holes."""
        sheets = [sheet for sheet in self.opened.sheets if self.on_sheet(sheet)]
        credit = self.end.credit_behind
        if credit and len(sheets) > 1:
            raise InputError(
                "credit_behind: offered where all holes lie in one sheet, as an angle's two legs;"
                f" {self.section.designation} has holes in {len(sheets)}"
            )
        gross = self.section.A / self.opened.components
        return tuple(
            (
                sheet,
                least_path(
                    sheet.part,
                    self.on_sheet(sheet),
                    credit_behind=credit,
                    gross=gross if credit else None,
                ),
            )
            for sheet in sheets
        )

    # Bolts --------------------------------------------------------------------------------

    @cached_property
    def grips(self) -> tuple[Grip, ...]:
        """Every element with bolts, the one on the gusset first."""
        named = [e for e, holes in self.elements.items() if any(h.bolt for h in holes)]
        several = len(named) > 1
        return tuple(self._grip(element, f", {element}" if several else "") for element in named)

    def _grip(self, element: str, where: str) -> Grip:
        holes = tuple(self.elements[element])
        bolts = [hole for hole in holes if hole.bolt]
        last = max(b.x for b in bolts)
        stated = self.end.plate_end_distance
        beyond = min(b.x for b in bolts) if stated is None else in_mm(stated)
        half = max(b.along for b in bolts) / 2
        if beyond <= half:
            raise InputError(
                f"plate_end_distance: got {beyond:g} mm; more than {half:g} mm, half the hole, is"
                " due"
            )
        edge = last + beyond
        side = self.plate_side(bolts)
        beside = _WIDE if side is None else side
        zero = min(b.y for b in bolts) - beside
        width = max(b.y for b in bolts) + beside - zero
        t_p = in_mm(self.end.plate.thickness)
        free = side is not None
        plate: Part = Flat.plain(width, t_p, low_free=free, high_free=free)
        # Only the joint's own holes are in the gusset.
        plate_holes = tuple(replace(b, x=edge - b.x, y=b.y - zero) for b in bolts)
        shape = self.end.plate.shape
        if shape is not None and self.end.at_gusset("" if element == self.end.to else element):
            middle = math.fsum(b.y for b in bolts) / len(bolts)
            own = GussetPart(shape, t_p, edge + 1e4)
            plate_holes = tuple(
                replace(b, x=x, y=y) for b in bolts for x, y in (own.to_part(b.x, b.y - middle),)
            )
            plate = own
        check_holes(plate, plate_holes)
        if isinstance(plate, GussetPart):
            for hole in plate_holes:
                e, half = plate.edge_distance(hole.x, hole.y), hole.along / 2
                if e <= half:
                    raise InputError(
                        f"hole {hole.mark!r}: {e:g} mm from an edge of the gusset; more than half"
                        f" the hole, {half:g} mm, is due"
                    )
        return Grip(
            element,
            where,
            element_part(self.section, element),
            holes,
            plate,
            plate_holes,
            _spread(bolts),
        )

    def plate_side(self, bolts: Sequence[Opening]) -> float | None:
        """Outer bolt to the side edge of the plate, mm; None where it is not stated."""
        stated, plate = self.end.plate_edge_distance, self.end.plate
        side = None if stated is None else in_mm(stated)
        name = "plate_edge_distance"
        if stated is None and isinstance(plate, Covers):
            ys = [b.y for b in bolts]
            side, name = (in_mm(plate.width) - (max(ys) - min(ys))) / 2, "plate.width"
        least = max(b.across for b in bolts) / 2
        if side is not None and side <= least:
            raise InputError(
                f"{name}: {side:g} mm from the outer bolt to the plate's side edge; more than half"
                f" the hole, {least:g} mm, is due"
            )
        return side

    @property
    def whole_section_held(self) -> bool:
        """Whether bolts go through every element, each with at least half of its part of the area
        in its part of the bolts: else the section is not held evenly."""
        held = {grip.element: len(grip.bolts) for grip in self.grips}
        areas = {}
        for element in self.opened.elements:
            part = element_part(self.section, element)
            areas[element] = part.width * part.strips[0].t
        total, bolts = sum(areas.values()), sum(held.values())
        return all(
            held.get(element, 0) / bolts >= 0.5 * area / total for element, area in areas.items()
        )

    @property
    def spliced(self) -> bool:
        """Whether cover plates take the place of a gusset."""
        return isinstance(self.end.plate, Covers)

    @property
    def plates(self) -> int:
        """Plates that share the force: two cover plates, or one gusset."""
        return self.end.plate.number if isinstance(self.end.plate, Covers) else 1

    def member_block(self, grip: Grip) -> Block | None:
        """The block that governs in the member's element.

        A surface from edge to edge is a net section with a step in shear: the net section itself
        is weaker, and checked.
        """
        forms = self._forms(*self.strengths, self.end.block_tension == "uniform")
        return least_block(grip.part, grip.holes, forms, edge_to_edge=False)

    def plate_chain(self, grip: Grip) -> NetPath:
        """The chain that takes most of the gusset, or of each cover plate."""
        return least_path(grip.plate, grip.plate_holes)

    def plate_block(self, grip: Grip) -> Block | None:
        """The block that governs in the gusset or in each cover plate."""
        t_p = in_mm(self.end.plate.thickness)
        steel = grade(self.end.plate.steel, "plate.steel")
        forms = self._forms(steel.f_y(t_p), steel.f_u(t_p), self.end.block_tension == "uniform")
        return least_block(grip.plate, grip.plate_holes, forms, edge_to_edge=False)

    @cached_property
    def bolts(self) -> tuple[Opening, ...]:
        return tuple(b for grip in self.grips for b in grip.bolts)

    @cached_property
    def group(self) -> BoltGroup:
        """Each bolt's share of the force."""
        if self.end.share == "equal":
            return elastic_shares(self.bolts, None)
        if len(self.grips) > 1:
            raise InputError(
                "share: 'elastic' is offered for bolts through one element; give share='equal'"
            )
        return elastic_shares(self.bolts, member_line(self.section, self.grips[0].element))

    @property
    def joint_length(self) -> float:
        xs = [b.x for b in self.bolts]
        return max(xs) - min(xs)


def _spread(bolts: Sequence[Opening]) -> Spread:
    last = min(b.x for b in bolts)
    low = min(bolts, key=lambda b: b.y - (b.x - last) * _TAN_30)
    high = max(bolts, key=lambda b: b.y + (b.x - last) * _TAN_30)
    return Spread(
        low.y - (low.x - last) * _TAN_30,
        high.y + (high.x - last) * _TAN_30,
        high.y - low.y,
        low.x - last,
        high.x - last,
    )


# Inputs -----------------------------------------------------------------------------------


def pattern_numbers(
    shape: PatternGeometry, prefix: str
) -> tuple[dict[str, Number], dict[str, str], dict[str, tuple[Inputs, ...]]]:
    """Numbers, choices and parts of a pattern end, beside what every bolted end has."""
    end, group = shape.end, shape.group
    bolts = shape.bolts
    numbers = {
        "n_c": Number(float(shape.opened.components), _COUNTED),
        "n_b": Number(float(len(bolts)), _COUNTED),
    }
    if shape.joint_length > 0.0:
        numbers["L_j"] = Number(shape.joint_length, "first bolt to last, from the pattern")
    if end.share == "elastic":
        numbers["e_b"] = Number(group.e, "member's centroid and the bolts' centroid")
        numbers["I_b"] = Number(group.I_p, _COUNTED)
    chain, chain_parts, behind = _chain_inputs(shape, prefix)
    if behind is not None:
        numbers["n_k"] = Number(behind, _FOUND)
    numbers |= _spacing(shape)
    drilled = {h.mark: h for h in end.holes.holes}
    usual, _ = shape.hole_size("standard")
    # A hole reamed wider than standard is an oversize hole by another name.
    kinds = [
        "oversize" if b.along == b.across and b.along > usual else drilled[b.mark].kind
        for b in bolts
    ]
    play = sorted(
        f"hole {b.mark}, {kind}"
        for b, kind in zip(bolts, kinds, strict=True)
        if kind == "oversize" or (kind.endswith("slot") and drilled[b.mark].slot == "along")
    )
    worst = next(k for k in ("long slot", "short slot", "oversize", "standard") if k in kinds)
    choices = {
        "share": end.share,
        "block_tension": end.block_tension,
        "chain": chain,
        "plate": "Cover plates" if shape.spliced else "Gusset",
        "all_elements": "yes" if shape.whole_section_held else "no",
        "play": "; ".join(play) if play and shape.fastener.category != "TF" else "none",
        "hole_kind": worst,
    }
    most = most_loaded(group)
    parts = {
        "chain": chain_parts,
        "most loaded": (_bolt_inputs(shape, most.mark, prefix + "most loaded ", {}),),
        "grips": tuple(
            _grip_inputs(shape, grip, f"{prefix}grip {i} ")
            for i, grip in enumerate(shape.grips, start=1)
        ),
        "edges": _edges(shape, prefix),
    }
    return numbers, choices, parts


def _hop_inputs(hops: Sequence[Hop], usual: float, prefix: str) -> tuple[Inputs, ...]:
    found = []
    for k, hop in enumerate(hops, start=1):
        numbers = {"d_h": Number(hop.hole.across, f"hole {hop.hole.mark}")}
        if hop.t != usual:
            numbers["t"] = Number(hop.t, f"at hole {hop.hole.mark}")
        if hop.s > 0.0:
            step = f"to hole {hop.hole.mark}"
            numbers |= {"s": Number(hop.s, step), "g": Number(hop.g, step)}
            if hop.t_step != hop.t:
                numbers["t_s"] = Number(hop.t_step, step + ", the thinner plate")
        found.append(Inputs({"mark": hop.hole.mark}, numbers, {}, f"{prefix}hole {k}: "))
    return tuple(found)


def _chain_words(hops: Sequence[Hop]) -> str:
    marks = [hop.hole.mark for hop in hops]
    return ("hole " if len(marks) == 1 else "holes ") + " – ".join(marks)


def _chain_inputs(
    shape: PatternGeometry, prefix: str
) -> tuple[str, tuple[Inputs, ...], float | None]:
    hops: list[Inputs] = []
    words = []
    behind = None
    for i, (_, path) in enumerate(shape.chains, start=1):
        hops += _hop_inputs(path.hops, shape.place.thickness, f"{prefix}chain {i} ")
        words.append(_chain_words(path.hops))
        if shape.end.credit_behind:
            behind = float(round((1.0 - path.carried) * len(shape.bolts)))
    return "; ".join(words), tuple(hops), behind


def _bolt_inputs(
    shape: PatternGeometry, mark: str, prefix: str, more: dict[str, Number], **choices: str
) -> Inputs:
    numbers = dict(more)
    if shape.end.share == "elastic":
        share = next(s for s in shape.group.shares if s.mark == mark)
        numbers |= {
            "x_b": Number(share.x, f"bolt {mark}"),
            "y_b": Number(share.y, f"bolt {mark}"),
        }
    return Inputs({"mark": mark, **choices}, numbers, {}, prefix)


def _grip_inputs(shape: PatternGeometry, grip: Grip, prefix: str) -> Inputs:
    end, section = shape.end, shape.section
    t = grip.part.strips[0].t
    t_p = in_mm(end.plate.thickness)
    total = len(shape.bolts)
    plate_numbers = {
        "n_e": Number(float(shape.plates), _COUNTED),
    }
    if end.plate.width is not None:
        width = in_mm(end.plate.width)
        needed = grip.spread.apart + max(b.across for b in grip.bolts)
        if width <= needed:
            raise InputError(
                f"plate.width: got {width:g} mm; more than {needed:g} mm, from the outer edges of"
                " the holes, is due"
            )
        plate_numbers["b_p"] = Number(width, "given")
    spread = grip.spread
    if spread.high > spread.low:
        plate_numbers |= {
            "s_o": Number(spread.apart, _COUNTED),
            "L_o1": Number(spread.reach_low, _COUNTED),
            "L_o2": Number(spread.reach_high, _COUNTED),
        }
    plate_chain = shape.plate_chain(grip)
    plate = Inputs(
        {"part": "gusset", "chain": _chain_words(plate_chain.hops)},
        plate_numbers,
        {},
        prefix + "plate: ",
        {
            "tear-out": (_tear_out(shape, grip.plate, grip.plate_holes, prefix + "plate ", 1.0),),
            "chain": _hop_inputs(plate_chain.hops, t_p, prefix + "plate chain "),
            "block": _block_inputs(shape.plate_block(grip), total, prefix + "plate "),
        },
    )
    numbers = {
        "n_e": Number(float(shape.opened.components), _COUNTED),
        "n_m": Number(float(len(grip.bolts)), _COUNTED),
    }
    if t != shape.place.thickness:
        numbers["t"] = Number(t, section.source)
    return Inputs(
        {"part": "member", "where": grip.where},
        numbers,
        {},
        prefix + "member: ",
        {
            "tear-out": (_tear_out(shape, grip.part, grip.holes, prefix + "member ", -1.0),),
            "block": _block_inputs(shape.member_block(grip), total, prefix + "member "),
            "plate": (plate,),
        },
    )


def _tear_out(
    shape: PatternGeometry, part: Part, holes: Sequence[Opening], prefix: str, sign: float
) -> Inputs:
    """The bolt with the greatest force on its tear-out capacity, and its clear distance."""
    half = shape.fastener.d_f / 2
    shares = {s.mark: s for s in shape.group.shares}
    # A part's own axes run from its free end inwards, so the bolt presses towards -x; across, it
    # presses as the member is pulled on the gusset and against that on the member.
    clear = {
        hole.mark: clear_distance(
            part,
            holes,
            hole,
            direction=(-shares[hole.mark].along, sign * shares[hole.mark].across),
        )
        for hole in holes
        if hole.bolt
    }
    here = replace(shape.group, shares=tuple(shares[mark] for mark in clear))
    worst = worst_tear_out(here, {mark: l_c + half for mark, l_c in clear.items()}).mark
    to = "to the nearest edge or hole in its way"
    number = Number(clear[worst], f"bolt {worst}, {_FOUND}")
    return _bolt_inputs(shape, worst, prefix + "tear-out: ", {"l_c": number}, to=to)


def _block_inputs(found: Block | None, bolts: int, prefix: str) -> tuple[Inputs, ...]:
    if found is None:
        return ()
    shear = [piece for piece in found.pieces if piece.kind == "shear"]
    tension = [piece for piece in found.pieces if piece.kind == "tension"]

    def added(values: list[float]) -> str:
        return " + ".join(f"{value:.5g}" for value in values if value) or "0"

    def total(values: list[float]) -> Number:
        return Number(math.fsum(values), f"{added(values)} mm, {_FOUND}")

    def lost(piece: Piece) -> float:
        # Where holes take more than there is, nothing is left, and never less than that.
        return piece.lost if piece.net > 0.0 else piece.gross

    numbers = {
        "L_gv": total([p.gross for p in shear]),
        "h_v": total([lost(p) for p in shear]),
        "b_gt": total([p.gross for p in tension]),
        "h_t": total([lost(p) for p in tension]),
    }
    credits = [p.credit for p in tension if p.net > 0.0]
    if any(credits):
        numbers["c_t"] = total(credits)
    if len(found.separated) < bolts:
        numbers["n_sb"] = Number(float(len(found.separated)), _FOUND)
    marks = list(dict.fromkeys(found.marks))
    words = f"through hole{'s' if len(marks) > 1 else ''} {', '.join(marks)}"
    return (
        Inputs(
            {"words": words, "separated": ", ".join(found.separated)},
            numbers,
            {},
            prefix + "block: ",
        ),
    )


def _spacing(shape: PatternGeometry) -> dict[str, Number]:
    """Distances between bolts of one element: the nearest two, and the loneliest one."""
    nearest: dict[str, tuple[float, str]] = {}
    for grip in shape.grips:
        for a, b in combinations(grip.bolts, 2):
            apart = math.hypot(a.x - b.x, a.y - b.y)
            for one, other in ((a, b), (b, a)):
                if one.mark not in nearest or apart < nearest[one.mark][0]:
                    nearest[one.mark] = (apart, f"bolts {one.mark} and {other.mark}")
    if not nearest:
        return {}
    near, far = min(nearest.values()), max(nearest.values())
    return {"s_near": Number(*near), "s_far": Number(*far)}


def _edges(shape: PatternGeometry, prefix: str) -> tuple[Inputs, ...]:
    """Every edge with the bolt nearest to it."""
    cut = shape.end.edge_kind
    found: list[tuple[str, str, float, str, float | None]] = []
    for grip in shape.grips:
        own, bolts = grip.part.strips[0].t, grip.bolts
        t = None if own == shape.place.thickness else own
        first = min(bolts, key=lambda b: b.x)
        found.append((f"member end{grip.where}", cut, first.x, first.mark, t))
        sides = [(min(grip.part.to_low(b.x, b.y), grip.part.to_high(b.x, b.y)), b) for b in bolts]
        side, at = min(sides, key=lambda pair: pair[0])
        if math.isfinite(side):
            found.append((f"member side{grip.where}", "rolled", side, at.mark, t))
        holes = [hole for hole in grip.plate_holes if hole.bolt]
        if isinstance(grip.plate, GussetPart):
            own_edge = [(grip.plate.edge_distance(b.x, b.y), b.mark) for b in holes]
            e, mark = min(own_edge)
            if math.isfinite(e):
                found.append((f"gusset edge{grip.where}", cut, e, mark, None))
            continue
        ends = [(grip.plate.to_end(b.x, b.y), b.mark) for b in holes]
        beside = [
            (min(grip.plate.to_low(b.x, b.y), grip.plate.to_high(b.x, b.y)), b.mark) for b in holes
        ]
        for of, (e, mark) in (("gusset end", min(ends)), ("gusset side", min(beside))):
            if math.isfinite(e):
                found.append((of + grip.where, cut, e, mark, None))
    return tuple(
        Inputs(
            {
                "number": str(k),
                "of": of.replace("gusset", "cover plate") if shape.spliced else of,
                "cut": how,
                "part": of.partition(" ")[0],
            },
            {
                "e": Number(e, f"bolt {mark}"),
                **({} if t is None else {"t": Number(t, shape.section.source)}),
            },
            {},
            f"{prefix}edge {k}: ",
        )
        for k, (of, how, e, mark, t) in enumerate(found, start=1)
    )
