"""What a walk is given of a welded end."""

from __future__ import annotations

import math

from tensionlib.calculation.inputs import Inputs, Number
from tensionlib.joints.ends import AGREE_WELDED
from tensionlib.joints.fillet_group import elastic_stress, properties
from tensionlib.joints.stated import in_mm
from tensionlib.joints.welded_runs import member_line
from tensionlib.members.pieces import NOTHING, Given, Piece, refuses
from tensionlib.steel import Section, weld_metal

_STATED = "given"
_COUNTED = "from the connection"


def _metal(given: Given) -> Inputs:
    metal = weld_metal(given.end.metal)
    return Inputs({"quality": given.end.quality}, {"f_uw": Number(metal.f_uw, metal.source)})


def _runs_along(given: Given) -> Inputs:
    end = given.end
    numbers = {
        "t_w": Number(in_mm(end.leg_size), _STATED),
        "l_1": Number(in_mm(end.length_1), _STATED),
        "l_2": Number(in_mm(end.length_1 if end.length_2 is None else end.length_2), _STATED),
    }
    return Inputs({}, numbers)


def _run_across(given: Given) -> Inputs:
    transverse = given.end.transverse
    return (
        NOTHING if transverse is None else Inputs({}, {"l_t": Number(in_mm(transverse), _STATED)})
    )


def _slot(given: Given) -> Inputs:
    end = given.end
    if end.to != "slot":
        return NOTHING
    numbers = {
        "n_s": Number(2.0, _COUNTED),
        "c_s": Number(in_mm(end.slot_clearance), _STATED),
    }
    by_length = "by length" if end.shear_lag_by_length else "none"
    return Inputs({"shear_lag": by_length}, numbers | _slotted(given.section))


def _slotted(section: Section) -> dict[str, Number]:
    """What a slotted tube's shear lag goes by: its height along the gusset, its centroid off it."""
    d = section.dims
    if section.shape == "CHS":
        height, off = d["d"], d["d"] / math.pi
        origin = "outside diameter over π"
    else:
        height, width = d["d"], d["b"]
        off = (width * width + 2 * width * height) / (4 * (width + height))
        origin = "(B² + 2BH) / (4(B + H)) of the tube"
    return {"h_s": Number(height, section.source), "x_bar": Number(off, origin)}


WELDED_PIECES = (
    *(refuses(agree, reads) for agree, reads in AGREE_WELDED),
    Piece(_metal, ("end.metal", "end.quality")),
    Piece(_runs_along, ("end.leg_size", "end.length_1", "end.length_2")),
    Piece(_run_across, ("end.transverse",)),
    Piece(_slot, ("section", "end.to", "end.slot_clearance", "end.shear_lag_by_length")),
)


def any_runs(given: Given) -> Inputs:
    """An end of any runs of fillet, as a group."""
    section, end = given.section, given.end
    metal = weld_metal(end.metal)
    runs = [run.as_run() for run in end.runs]
    group = properties(runs)
    line = member_line(section, end.to)
    peak = elastic_stress(group, line)
    ys = [y for run in runs for y in (run.y_1, run.y_2)]
    # The force spreads along runs that lie along it; a group without such runs spreads nothing.
    along = [run.length for run in runs if run.angle < math.pi / 4]
    legs = [run.leg for run in runs]
    found = "from the runs"
    numbers = {
        "f_uw": Number(metal.f_uw, metal.source),
        "A_wn": Number(group.area, found),
        "I_wn": Number(group.I_p, found),
        "e_w": Number(group.y_c - line, "member's centroid and the weld's centroid"),
        "x_w": Number(peak.x, f"end of run {peak.mark}"),
        "y_w": Number(peak.y, f"end of run {peak.mark}"),
        "t_w": Number(min(legs), "smallest leg of the runs"),
        "l_min": Number(min(along, default=0.0), found),
        "l_max": Number(max(run.length for run in runs), found),
        "l_r": Number(min(run.length for run in runs), found),
        "b_r": Number(max(ys) - min(ys), found),
    }
    if max(legs) > min(legs):
        numbers["t_w2"] = Number(max(legs), "largest leg of the runs")
    return Inputs({"quality": end.quality, "worst": peak.mark}, numbers)
