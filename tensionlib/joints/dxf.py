"""A part's drawing as DXF: true size in mm, one layer a kind of line, real dimensions.

Layers: CUT the outline to be cut, BREAK where the part goes on, HOLES, FOLD, NET and BLOCK the
failure surfaces, DIM, TEXT.
"""

from __future__ import annotations

import io
import os
import tempfile
from collections.abc import Sequence
from importlib import import_module
from itertools import pairwise
from pathlib import Path
from typing import Any

from tensionlib.errors import InputError
from tensionlib.joints.part_view import PartView, hatch
from tensionlib.joints.parts import Opening

_LAYERS = {
    "CUT": (7, "CONTINUOUS"),
    "BREAK": (8, "CONTINUOUS"),
    "HOLES": (7, "CONTINUOUS"),
    "FOLD": (8, "CENTER"),
    "NET": (1, "DASHDOT"),
    "BLOCK": (5, "DASHED"),
    "DIM": (8, "CONTINUOUS"),
    "TEXT": (7, "CONTINUOUS"),
}


def _plain(text: str) -> str:
    """A text that DXF readers take literally: no line breaks, no control codes."""
    return " ".join(text.split()).replace("%%", "% %").replace("^", "^ ")


def to_dxf(view: PartView) -> str:
    """The drawing as the text of a DXF file (R2010), the same text for the same view."""
    options = import_module("ezdxf").options
    # Dates and identities would differ from run to run; ezdxf has a switch for those.
    before = options.write_fixed_meta_data_for_testing
    options.write_fixed_meta_data_for_testing = True
    try:
        return _drawn(view)
    finally:
        options.write_fixed_meta_data_for_testing = before


def _drawn(view: PartView) -> str:
    from ezdxf import units
    from ezdxf.filemanagement import new

    document = new("R2010", setup=True)
    document.units = units.MM
    document.header["$LTSCALE"] = 10.0
    for name, (colour, line) in _LAYERS.items():
        document.layers.add(name, color=colour, linetype=line)
    space = document.modelspace()
    _outline(space, view)
    for hole in view.holes:
        _hole(space, hole)
    left, bottom, right, top = view.box
    height = max(2.5, (top - bottom) / 45)
    for y, word in view.folds:
        space.add_line((left, y), (right, y), dxfattribs={"layer": "FOLD"})
        _text(space, word, right + height, y, height)
    for hole in view.holes:
        shift = max(hole.along, hole.across) * 0.36 + height * 0.4
        _text(space, hole.mark, hole.x + shift, hole.y + shift, height)
    if view.net:
        space.add_lwpolyline(view.net, dxfattribs={"layer": "NET"})
    for piece in view.block:
        space.add_line(piece.start, piece.end, dxfattribs={"layer": "BLOCK"})
    for area in view.torn:
        for start, end in hatch(area, max((top - bottom) / 40, 2.0), view.outline):
            space.add_line(start, end, dxfattribs={"layer": "BLOCK"})
    _dimensions(space, view, height)
    words = [view.title, view.net_label, *view.block_labels, *view.notes]
    for k, word in enumerate(word for word in words if word):
        _text(space, word, left, bottom - height * (9 + 1.8 * k), height)
    stream = io.StringIO()
    document.write(stream)
    return stream.getvalue()


def _outline(space: Any, view: PartView) -> None:
    """The outline on CUT; a part that goes on has its cut edges open on BREAK."""
    if not view.cut:
        space.add_lwpolyline(view.outline, close=True, dxfattribs={"layer": "CUT"})
        return
    corners = view.outline
    for i, start in enumerate(corners):
        end = corners[(i + 1) % len(corners)]
        layer = "BREAK" if i in view.cut else "CUT"
        space.add_line(start, end, dxfattribs={"layer": layer})


def _hole(space: Any, hole: Opening) -> None:
    if hole.along == hole.across:
        space.add_circle((hole.x, hole.y), hole.along / 2, dxfattribs={"layer": "HOLES"})
        return
    long, short = max(hole.along, hole.across) / 2, min(hole.along, hole.across) / 2
    d = long - short
    if hole.along > hole.across:
        points = [
            (hole.x - d, hole.y - short, 0.0),
            (hole.x + d, hole.y - short, 1.0),
            (hole.x + d, hole.y + short, 0.0),
            (hole.x - d, hole.y + short, 1.0),
        ]
    else:
        points = [
            (hole.x + short, hole.y - d, 0.0),
            (hole.x + short, hole.y + d, 1.0),
            (hole.x - short, hole.y + d, 0.0),
            (hole.x - short, hole.y - d, 1.0),
        ]
    space.add_lwpolyline(points, format="xyb", close=True, dxfattribs={"layer": "HOLES"})


def _text(space: Any, text: str, x: float, y: float, height: float) -> None:
    shown = _plain(text)
    if shown:
        space.add_text(shown, height=height, dxfattribs={"layer": "TEXT"}).set_placement((x, y))


def _dimensions(space: Any, view: PartView, height: float) -> None:
    """Chains below and to the left, as real dimensions."""
    left, bottom, _, _ = view.box
    # The library's own style prints lengths a hundred times as long.
    override = {"dimlfac": 1.0, "dimtxt": height, "dimasz": height * 0.8, "dimdec": 1}
    for a, b in pairwise(view.along):
        _dimension(space, (a, bottom), (b, bottom), (a, bottom - height * 4), 0.0, override)
    for a, b in pairwise(sorted(view.across)):
        _dimension(space, (left, a), (left, b), (left - height * 4, a), 90.0, override)


def _dimension(
    space: Any,
    first: tuple[float, float],
    second: tuple[float, float],
    base: tuple[float, float],
    angle: float,
    override: dict[str, float],
) -> None:
    size = abs(second[0] - first[0]) if angle == 0.0 else abs(second[1] - first[1])
    dimension = space.add_linear_dim(
        base=base,
        p1=first,
        p2=second,
        angle=angle,
        text=f"{size:.5g}",
        dimstyle="EZDXF",
        override=override,
        dxfattribs={"layer": "DIM"},
    )
    dimension.render()


def save_dxf(views: Sequence[PartView], folder: str | Path, stem: str) -> list[Path]:
    """Write each view as a DXF file in a folder, whole or not at all; gives the files' paths.

    Raises
    ------
    InputError
        For a folder that is not there.
    """
    where = Path(folder)
    if not where.is_dir():
        raise InputError(f"folder: {where} is not a folder; make it first")
    paths = []
    for k, view in enumerate(views, start=1):
        target = where / (f"{stem}-{k}.dxf" if len(views) > 1 else f"{stem}.dxf")
        handle, name = tempfile.mkstemp(dir=where, suffix=".part")
        try:
            with os.fdopen(handle, "w", encoding="utf-8", newline="\n") as stream:
                stream.write(to_dxf(view))
            os.replace(name, target)
        except BaseException:
            Path(name).unlink(missing_ok=True)
            raise
        paths.append(target)
    return paths
