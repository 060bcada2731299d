"""Sections: computed from their outlines, compared with lists and with another library."""

from __future__ import annotations

import math
import pickle

import numpy as np
import pytest

from tensionlib.errors import DataNotFoundError, InputError, UnitError
from tensionlib.steel import by_dimensions, catalogue, double, find, section, stated
from tensionlib.steel.outline import Circle, Corner, Outline, Properties
from tensionlib.steel.sections import DENSITY, FAMILIES, _family

ALL = catalogue().sections


@pytest.mark.parametrize("row", ALL, ids=lambda s: s.designation)
def test_area_meets_the_listed_area_or_mass(row):
    """0.5 %, the listed area where there is one, else the listed mass."""
    listed = row.A_listed or row.mass / (DENSITY * 1000.0)
    assert row.A == pytest.approx(listed, rel=0.005)
    assert "from memory" in row.source or "mass from size" in row.source


def test_every_family_has_rows():
    for family in FAMILIES:
        assert len(_family(family)) >= 9, family
    designations = [s.designation for s in ALL]
    assert len(set(designations)) == len(designations)
    assert len(ALL) > 280


def _compared(row):
    """The same shape by sectionproperties, with fine arcs."""
    from sectionproperties.analysis import Section as Analysis
    from sectionproperties.pre.library import steel_sections as made

    d = row.dims
    if row.shape == "angle":
        shape = made.angle_section(d["b1"], d["b2"], d["t"], d["r1"], d["r2"], 32)
    elif row.shape == "channel":
        shape = made.channel_section(d["d"], d["b_f"], d["t_f"], d["t_w"], d["r1"], 32)
    elif row.shape == "I":
        shape = made.i_section(d["d"], d["b_f"], d["t_f"], d["t_w"], d["r1"], 32)
    elif row.shape == "tee":
        shape = made.tee_section(d["d"], d["b_f"], d["t_f"], d["t_w"], d["r1"], 32)
    elif row.shape == "CHS":
        shape = made.circular_hollow_section(d["d"], d["t"], 256)
    else:
        shape = made.rectangular_hollow_section(d["d"], d["b"], d["t"], d["r_ext"], 32)
    shape.create_mesh(mesh_sizes=[0])
    analysis = Analysis(shape)
    analysis.calculate_geometric_properties()
    i_xx, i_yy, i_xy = analysis.get_ic()
    return analysis.get_area(), analysis.get_c(), i_xx, i_yy, i_xy


SAMPLE = [s for s in ALL if s.family in ("EA", "UA", "PFC")] + [
    s for s in ALL if s.family in ("UB", "UC", "BT", "CT", "CHS", "SHS", "RHS")
][::6]


@pytest.mark.filterwarnings("default")
@pytest.mark.parametrize("row", SAMPLE, ids=lambda s: s.designation)
def test_properties_agree_with_sectionproperties(row):
    A, (x_c, y_c), i_xx, i_yy, i_xy = _compared(row)
    assert row.A == pytest.approx(A, rel=5e-4)
    assert row.I_x == pytest.approx(i_xx, rel=2e-3)
    assert row.I_y == pytest.approx(i_yy, rel=2e-3)
    p = Properties.of(row.outline().moments())
    assert abs(p.I_xy) == pytest.approx(abs(i_xy), rel=2e-3, abs=1e-3 * i_xx)
    if row.shape in ("angle", "channel"):
        assert row.x_c == pytest.approx(x_c, rel=1e-3)
        assert row.y_c == pytest.approx(y_c, rel=1e-3)


def test_segments_against_a_closed_form_and_a_fine_polygon():
    """A square with all corners rounded to half its side is a circle."""
    side = 40.0
    corners = [(0, 0), (side, 0), (side, side), (0, side)]
    rounded = Outline(tuple(Corner(x, y, side / 2) for x, y in corners))
    p = Properties.of(rounded.moments())
    q = Properties.of(Outline(Circle(side / 2, side / 2, side / 2)).moments())
    for name in ("A", "x_c", "y_c", "I_x", "I_y"):
        assert getattr(p, name) == pytest.approx(getattr(q, name), rel=1e-12)
    assert p.I_xy == pytest.approx(0.0, abs=1e-6 * p.I_x)
    assert q.A == pytest.approx(math.pi * 400.0)
    assert q.r_min == pytest.approx(10.0)


def test_moving_the_outline_moves_only_its_centroid():
    shape = section("150x90x12 UA").outline()
    assert not isinstance(shape.outer, Circle)
    moved = Outline(tuple(Corner(c.x + 37.0, c.y - 11.0, c.r) for c in shape.outer))
    p, q = Properties.of(shape.moments()), Properties.of(moved.moments())
    assert q.x_c - p.x_c == pytest.approx(37.0)
    assert q.y_c - p.y_c == pytest.approx(-11.0)
    for name in ("A", "I_x", "I_y", "I_xy", "r_min"):
        assert getattr(q, name) == pytest.approx(getattr(p, name), rel=1e-9)


@pytest.mark.parametrize(
    ("written", "meant"),
    [
        ("150 x 90 x 10 ua", "150x90x10 UA"),
        ("150×90×10UA", "150x90x10 UA"),
        ("100X100X8 EA", "100x100x8 EA"),
        ("150pfc", "150 PFC"),
        ("310UB40.4", "310 UB 40.4"),
        ("155BT20.2", "155 BT 20.2"),
        ("2/150x90x10 UA, long legs, gap 12 mm", "2/150x90x10 UA, long legs, gap 12 mm"),
        ("2/150 PFC, gap 16 mm", "2/150 PFC, webs, gap 16 mm"),
        ("2 / 150 pfc, gap 1.6 cm, Webs", "2/150 PFC, webs, gap 16 mm"),
        (
            "2/150 x 90 x 10 UA, short legs back to back, gap 12 mm",
            "2/150x90x10 UA, short legs, gap 12 mm",
        ),
        ("2/100x100x8 EA, legs, gap 10 mm", "2/100x100x8 EA, long legs, gap 10 mm"),
    ],
)
def test_designations_are_read_tolerantly(written, meant):
    assert section(written).designation == meant


@pytest.mark.parametrize(
    ("name", "says"),
    [
        ("150x90x9 UA", "Did you mean '150x90x"),
        ("150 PFCC", "Did you mean '150 PFC'"),
        ("nothing like it", "For example '150x90x10 UA'"),
    ],
)
def test_unknown_designations_name_the_nearest(name, says):
    with pytest.raises(DataNotFoundError, match=says):
        section(name)


@pytest.mark.parametrize(
    ("name", "says"),
    [
        ("2/150x90x10 UA", "states no gap; write it as '2/150x90x10 UA, long legs, gap 12 mm'"),
        ("2/150x90x10 UA, toes, gap 12 mm", "'toes' in .* says nothing of a pair; write it as"),
        ("2/150 PFC, legs, gap 12 mm", "facing: got 'long leg'; 150 PFC makes pairs by its web"),
        ("2/150x90x10 UA, webs, gap 12 mm", "facing: got 'web'; .* by its long leg, short leg"),
        ("2/310 UB 40.4, gap 12 mm", "single: 310 UB 40.4 makes no pairs"),
        ("2/150x90x10 UA, long legs, gap 12", "gap: got '12', a number without a unit"),
    ],
)
def test_pairs_that_cannot_be_read_say_how_to_write_them(name, says):
    with pytest.raises((InputError, UnitError), match=says):
        section(name)


@pytest.mark.parametrize(
    "one", [section("150 PFC"), section("2/150 PFC, webs, gap 16 mm")], ids=lambda s: s.designation
)
def test_sections_go_through_pickle(one):
    again = pickle.loads(pickle.dumps(one))
    assert (again, hash(again)) == (one, hash(one))
    with pytest.raises(TypeError, match="does not support item assignment"):
        again.dims["d"] = 1.0


def test_find_is_least_mass_first_and_meets_every_wish():
    found = find("UA", A_min="1500 mm2")
    assert found
    assert [s.mass for s in found] == sorted(s.mass for s in found)
    assert all(s.family == "UA" and s.A >= 1500 for s in found)
    assert {s.dims["b1"] for s in find("EA", leg="100 mm")} == {100.0}
    assert all(s.dims["d"] == 150 for s in find("PFC", depth="150 mm"))
    assert all(s.thickness("leg") >= 12 for s in find("EA", thickness_min="12 mm"))
    assert all(s.mass <= 20 for s in find(mass_max="20 kg/m"))
    with pytest.raises(UnitError, match="A_min"):
        find(A_min="1500 mm")
    with pytest.raises(DataNotFoundError, match="there are EA, UA"):
        find("XY")


def test_catalogue_columns_are_arrays_in_row_order():
    columns = catalogue()
    area = columns.column("A")
    assert area.shape == (len(ALL),)
    row = columns.row("150x90x10 UA")
    assert area[row] == section("150x90x10 UA").A
    assert np.isnan(columns.column("b1")[columns.row("150 PFC")])
    assert [columns.row(s) for s in columns.designations] == list(range(len(ALL)))
    assert columns.column("r_min")[row] == section("150x90x10 UA").r_min
    for name in ("A_g", "family", "designation", "outline"):
        with pytest.raises(DataNotFoundError, match=f"column: '{name}' is not listed; there are A"):
            columns.column(name)
    with pytest.raises(DataNotFoundError, match="is a pair"):
        columns.row("2/150 PFC, webs, gap 16 mm")


def test_pair_by_the_parallel_axis_rule():
    one = section("150x90x10 UA")
    pair = double(one, "12 mm", "long leg")
    assert pair.A == 2 * one.A
    assert pair.I_x == pytest.approx(2 * one.I_x)
    assert pair.I_y == pytest.approx(2 * (one.I_y + one.A * (one.x_c + 6.0) ** 2))
    assert pair.r_min == pytest.approx(math.sqrt(min(pair.I_x, pair.I_y) / pair.A))
    short = double(one, "12 mm", "short leg")
    assert short.I_x == pytest.approx(2 * (one.I_x + one.A * (one.y_c + 6.0) ** 2))
    with pytest.raises(InputError, match="makes pairs by its long leg, short leg"):
        double(one, "12 mm", "web")
    with pytest.raises(InputError, match="makes no pairs"):
        double("100x12 FL", "12 mm", "web")


def test_sections_of_your_own():
    own = by_dimensions("angle", b1="140 mm", b2="90 mm", t="12 mm", r1="10 mm", r2="5 mm")
    assert own.A == pytest.approx(12 * (140 + 90 - 12) + (1 - math.pi / 4) * (100 - 50))
    assert own.source == "dimensions stated by the user"
    inches = by_dimensions("flat", b="4 in", t="1/2 in")
    assert inches.A == pytest.approx(4 * 0.5 * 25.4**2)
    given = stated("built-up tie", A="2400 mm2", t="10 mm", b="120 mm", source="job calculation 12")
    assert (given.A, given.thickness("plate"), given.leg("plate")) == (2400.0, 10.0, 120.0)
    assert given.r_min is None


@pytest.mark.parametrize(
    ("shape", "dims", "says"),
    [
        ("angle", {"b1": "90 mm", "b2": "100 mm", "t": "8 mm"}, "b2: got 100 mm"),
        ("angle", {"b1": "100 mm", "b2": "90 mm"}, "t: missing"),
        ("angle", {"b1": "100 mm", "b2": "90 mm", "t": "95 mm"}, "t: got 95 mm"),
        ("angle", {"b1": "100 mm", "b2": "90 mm", "t": "0 mm"}, "t: got 0 mm; more than zero"),
        ("angle", {"b1": "100 mm", "b2": "90 mm", "t": "8 mm", "r2": "9 mm"}, "r2: got 9 mm"),
        ("CHS", {"d": "100 mm", "t": "60 mm"}, "t: got 60 mm; less than 50 mm, the radius"),
        ("flat", {"b": "100 mm", "t": "8 mm", "q": "1 mm"}, "q: the flat has no such dimension"),
        ("cross", {"b": "100 mm"}, "shape: 'cross' is not known"),
    ],
)
def test_dimensions_that_make_no_shape_are_refused(shape, dims, says):
    with pytest.raises((InputError, DataNotFoundError), match=says):
        by_dimensions(shape, **dims)


def test_elements():
    angle = section("150x90x10 UA")
    assert (angle.thickness("long leg"), angle.leg("long leg")) == (9.5, 150.0)
    assert angle.leg("short leg") == 90.0
    channel = section("150 PFC")
    assert (channel.thickness("web"), channel.thickness("flange")) == (6.0, 9.5)
    with pytest.raises(InputError, match="has no 'web'; it has long leg, short leg, leg"):
        angle.thickness("web")
    with pytest.raises(InputError, match="no single shape"):
        double(angle, "12 mm", "long leg").outline()
