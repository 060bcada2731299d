"""From a gusset's own outline to what its walk is given."""

from __future__ import annotations

import math
from collections.abc import Sequence

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.joints.ends import Bolted, Gusset
from tensionlib.joints.gusset_shape import Width
from tensionlib.joints.pattern_end import BoltedPattern
from tensionlib.joints.pinned import Pinned
from tensionlib.joints.rod import Threaded
from tensionlib.joints.stated import in_mm
from tensionlib.joints.welded_runs import WeldedRuns
from tensionlib.members.fastening import bolt_places
from tensionlib.members.geometry import Seat
from tensionlib.members.member import End
from tensionlib.steel import weld_metal

_OUTLINE = "from the gusset's outline"


def gusset_inputs(
    plate: Gusset, starts: Sequence[tuple[float, float]], metal: str, prefix: str
) -> tuple[dict[str, Number], tuple[Inputs, ...]]:
    """Numbers of the plate at the joint, and what is stated of the gusset beyond it.

    Parameters
    ----------
    starts : sequence of (u, v)
        Where the force begins to spread: bolts, or the far ends of the welds; the last row is the
        least u.
    metal : str
        Weld metal of the fillets to the support.
    """
    numbers: dict[str, Number] = {}
    more: dict[str, Number] = {}
    choices = {
        "spread": "",
        "reverses": "no" if plate.compression is None else "yes",
        "supports": "one",
        "quality": plate.support_quality,
    }
    support: tuple[Inputs, ...] = ()
    shape = plate.shape
    strips: list[float] = [] if plate.free_length is None else [in_mm(plate.free_length)]
    if shape is not None:
        last = min(u for u, _ in starts)
        width = shape.width(starts, last)
        stated = in_mm(plate.width) if plate.width is not None else None
        if stated is None or width.width < stated:
            numbers["b_p"] = Number(width.width, _OUTLINE)
        choices["spread"] = _said(width)
        if plate.free_length is None:
            strips = [s for s in shape.strips(last, width) if s is not None]
        edges = shape.free_edges()
        if edges:
            more["L_fe"] = Number(max(length for _, length in edges), _OUTLINE)
        runs = shape.support_runs()
        if plate.support_leg is not None and len(runs) > 1:
            choices["supports"] = "several"
        elif plate.support_leg is not None and runs:
            run = runs[0]
            more["t_ws"] = Number(in_mm(plate.support_leg), "given")
            more["f_uw"] = Number(weld_metal(metal).f_uw, weld_metal(metal).source)
            support = (
                Inputs(
                    {},
                    {
                        "L_sw": Number(run.length, _OUTLINE),
                        "k_a": Number(run.along, _OUTLINE),
                        "k_s": Number(run.square, _OUTLINE),
                        "e_s1": Number(run.lever, _OUTLINE),
                    },
                    {},
                    prefix + "support: ",
                ),
            )
    if plate.compression is not None:
        more["N_star_r"] = Number(in_mm(plate.compression), "given")
        if strips:
            more["L_f"] = Number(max(strips), "given" if plate.free_length else _OUTLINE)
            more["k_f"] = Number(plate.length_factor, "given")
    if shape is None and plate.compression is None:
        return numbers, ()
    return numbers, (Inputs(choices, more, {}, prefix + "gusset: ", {"support": support}),)


def _said(width: Width) -> str:
    cuts = [
        f"on the {side} side by {'a free edge' if cut == 'free edge' else 'the support'}"
        for side, cut in (("low", width.cut_low), ("high", width.cut_high))
        if cut
    ]
    if not cuts:
        return "The spread stays inside the gusset's outline."
    return "The spread is cut " + " and ".join(cuts) + "."


def spread_starts(end: End, place: Seat) -> list[tuple[float, float]]:
    """Where the force begins to spread in the gusset, in end coordinates (u, v), mm: each bolt,
    or both ends of each weld; v = 0 is the middle of the bolts or of the element."""
    if isinstance(end, Bolted | BoltedPattern):
        at = bolt_places(end)
        middle = math.fsum(y for _, y in at) / len(at)
        return [(x, y - middle) for x, y in at]
    if isinstance(end, Pinned | Threaded):
        return [(0.0, 0.0)]
    if isinstance(end, WeldedRuns):
        runs = [run.as_run() for run in end.runs]
        points = [p for r in runs for p in ((r.x_1, r.y_1), (r.x_2, r.y_2))]
        return [(x, y - place.width / 2) for x, y in points]
    b = place.width / 2
    first, second = in_mm(end.length_1), in_mm(end.length_2)
    return [(0.0, -b), (0.0, b), (first, -b), (second, b)]
