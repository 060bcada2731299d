"""Parts by themselves: nothing overlaps, all is said, and the DXF reads back true."""

from __future__ import annotations

import io
import math
import random
from itertools import pairwise

import pytest

import tensionlib as tl
from tensionlib.errors import InputError
from tensionlib.joints.dxf import to_dxf
from tensionlib.joints.part_view import PartView, describe_part, hatch, part_scene
from tensionlib.joints.parts import Opening
from tensionlib.joints.svg import to_svg
from tensionlib.members.part_views import part_views
from tensionlib.members.pattern import PatternGeometry
from tensionlib.standards import standard
from tests.builders import bolted, gusset, member

ezdxf = pytest.importorskip("ezdxf", reason="the package extra, which has ezdxf, is not installed")


def pattern_end(**changes):
    usual = {
        "to": "long leg",
        "bolts": "M20 8.8/S",
        "threads": "in shear plane",
        "holes": tl.Pattern.lines(3, ["50 mm", "105 mm"], "40 mm", "70 mm", ["0 mm", "35 mm"])
        + tl.Pattern.lines(2, ["55 mm"], "75 mm", "70 mm", element="short leg", first=7),
        "plate": gusset(width="260 mm"),
        "plate_edge_distance": "45 mm",
    }
    return tl.BoltedPattern(**usual | changes)


def views(end=None, section="150x100x12 UA", **changes):
    tie = member(section, end or pattern_end(**changes))
    (laid_out,) = tie.ends
    return part_views(PatternGeometry(tie.profile, tie.material, laid_out, standard("NZS 3404")))


def outlined():
    shape = tl.GussetShape(
        [(f"{x} mm", f"{y} mm") for x, y in ((0, 0), (420, 0), (420, 150), (250, 330), (0, 330))],
        (0,),
        ("150 mm", "100 mm"),
        "40 deg",
    )
    return views(bolted(plate=gusset(shape=shape)), "150x90x10 UA")


SAMPLES = {
    "both legs": views(),
    "no bolt": views(holes=pattern_end().holes.without_bolt("8").moved("2", dy="6 mm")),
    "slot": views(
        holes=tl.Pattern(
            (
                tl.Hole("1", "60 mm", "60 mm", kind="long slot"),
                tl.Hole("2", "150 mm", "60 mm", kind="long slot", slot="across"),
            )
        )
    ),
    "outlined": outlined(),
    "covers": views(
        tl.BoltedPattern(
            to="plate",
            bolts="M20 8.8/S",
            threads="in shear plane",
            holes=tl.Pattern.lines(3, ["45 mm", "105 mm"], "40 mm", "70 mm"),
            plate=tl.Covers("10 mm", "AS/NZS 3678 250", width="150 mm"),
        ),
        "150x16 FL",
    ),
}
ALL = [(name, view) for name, found in SAMPLES.items() for view in found]


@pytest.mark.parametrize(("name", "view"), ALL, ids=[f"{n}, {v.title}" for n, v in ALL])
def test_no_two_texts_overlap_and_all_stand_on_the_sheet(name, view):
    scene = part_scene(view)
    boxes = [(text.text, text.box()) for text in scene.texts()]
    for i, (one, a) in enumerate(boxes):
        assert a[0] >= 0.0, one
        assert a[2] <= scene.width, one
        assert 0.0 <= a[1], one
        assert a[3] <= scene.height, one
        for other, b in boxes[:i]:
            apart = a[0] >= b[2] or b[0] >= a[2] or a[1] >= b[3] or b[1] >= a[3]
            assert apart, (one, other)


def test_marks_keep_clear_of_each_other_on_random_patterns():
    rng = random.Random(20)
    for _ in range(30):
        holes = []
        while len(holes) < 7:
            x, y = rng.uniform(30, 320), rng.uniform(25, 175)
            if all(math.hypot(x - h.x, y - h.y) > 45 for h in holes):
                holes.append(Opening.round(str(len(holes) + 1), x, y, 22.0))
        view = PartView("Plate", ((0, 0), (350, 0), (350, 200), (0, 200)), holes=tuple(holes))
        boxes = [text.box() for text in part_scene(view).texts()]
        for i, a in enumerate(boxes):
            for b in boxes[:i]:
                assert a[0] >= b[2] or b[0] >= a[2] or a[1] >= b[3] or b[1] >= a[3]


def test_the_words_say_what_the_drawing_shows():
    member_view, gusset_view, _ = SAMPLES["both legs"]
    said = describe_part(member_view)
    assert "net section, holes 4 – 2 – 8" in said
    assert "hole 7 of 22 mm at 75 along and 193 across" in said
    assert "block: shear" in said
    assert "Gusset" in describe_part(gusset_view)
    empty = SAMPLES["no bolt"][0]
    assert "hole 8 of 22 mm at 145 along and 193 across, no bolt" in describe_part(empty)
    svg = to_svg(part_scene(empty))
    assert "crossed holes: no bolt" in svg
    assert "net section" in svg


def test_hatching_stays_inside_both_polygons():
    square = ((0.0, 0.0), (10.0, 0.0), (10.0, 10.0), (0.0, 10.0))
    half = ((0.0, 0.0), (5.0, 0.0), (5.0, 10.0), (0.0, 10.0))
    strokes = hatch(square, 1.0, half)
    assert strokes
    for start, end in strokes:
        for x, y in (start, end):
            assert -1e-9 <= x <= 5 + 1e-9
            assert -1e-9 <= y <= 10 + 1e-9
    assert sum(math.dist(*s) for s in hatch(square, 0.1)) == pytest.approx(100 / 0.1, rel=0.02)


# DXF --------------------------------------------------------------------------------------


def read(view):
    document = ezdxf.read(io.StringIO(to_dxf(view)))
    assert not document.audit().errors
    return document


@pytest.mark.parametrize(("name", "view"), ALL, ids=[f"{n}, {v.title}" for n, v in ALL])
def test_a_dxf_reads_back_with_true_holes_and_dimensions(name, view):
    document = read(view)
    assert document.units == ezdxf.units.MM
    space = document.modelspace()
    circles = sorted((c.dxf.center.x, c.dxf.center.y, c.dxf.radius) for c in space.query("CIRCLE"))
    round_holes = sorted((h.x, h.y, h.across / 2) for h in view.holes if h.along == h.across)
    assert circles == [pytest.approx(hole) for hole in round_holes]
    slots = [p for p in space.query("LWPOLYLINE") if p.dxf.layer == "HOLES"]
    assert len(slots) == sum(h.along != h.across for h in view.holes)
    sizes = sorted(d.get_measurement() for d in space.query("DIMENSION"))
    stops = [view.along, sorted(view.across)]
    due = sorted(b - a for chain in stops for a, b in pairwise(chain))
    assert sizes == pytest.approx(due)
    for dimension in space.query("DIMENSION"):
        assert float(dimension.dxf.text) == pytest.approx(dimension.get_measurement(), rel=1e-4)


def test_the_cut_outline_has_the_parts_area():
    view = SAMPLES["outlined"][1]
    (cut,) = (p for p in read(view).modelspace().query("LWPOLYLINE") if p.dxf.layer == "CUT")
    points = [(x, y) for x, y, *_ in cut.get_points()]
    shoelace = sum(
        a[0] * b[1] - b[0] * a[1] for a, b in zip(points, [*points[1:], points[0]], strict=True)
    )
    # The polygon of the corners: 420 by 330 less the cut corner of 170 by 180.
    assert abs(shoelace) / 2 == pytest.approx(420 * 330 - 170 * 180 / 2)
    assert cut.closed


def test_slots_have_round_ends():
    view = SAMPLES["slot"][0]
    slots = [p for p in read(view).modelspace().query("LWPOLYLINE") if p.dxf.layer == "HOLES"]
    for slot in slots:
        assert sorted(point[4] for point in slot.get_points()) == [0.0, 0.0, 1.0, 1.0]


def test_the_same_view_gives_the_same_bytes():
    view = SAMPLES["both legs"][0]
    assert to_dxf(view) == to_dxf(view)


def test_hostile_text_comes_out_literal():
    hostile = PartView(
        "Plate %%c {\\fArial;x}\nnext ^J",
        ((0, 0), (100, 0), (100, 80), (0, 80)),
        holes=(Opening.round("<b>1</b>", 50.0, 40.0, 22.0),),
    )
    texts = [t.dxf.text for t in read(hostile).modelspace().query("TEXT")]
    assert "<b>1</b>" in texts
    assert any(t.startswith("Plate % %c") and "\n" not in t for t in texts)
    assert "&lt;b&gt;1&lt;/b&gt;" in to_svg(part_scene(hostile))


def test_drawings_of_a_member_are_written_whole(tmp_path):
    written = tl.drawings(member("150x100x12 UA", pattern_end()), tmp_path)
    assert [p.name for p in written] == ["T1-1.dxf", "T1-2.dxf", "T1-3.dxf"]
    assert sorted(p.name for p in tmp_path.iterdir()) == [p.name for p in written]
    with pytest.raises(InputError, match="is not a folder"):
        tl.drawings(member(), tmp_path / "nowhere")
    from tests.builders import welded

    with pytest.raises(InputError, match="no bolted end"):
        tl.drawings(member(end=welded()), tmp_path)
