"""Elastic moduli, outstands and radii against hand sums and an independent program.

The independent figures are made here: integrals over rectangles for shapes of sharp corners, and
the finite elements of sectionproperties for catalogue sections with their fillets.
"""

from __future__ import annotations

import math

import numpy as np
import pytest

import tensionlib as tl
from tensionlib.errors import InputError
from tensionlib.steel.moduli import component_radius, elastic_moduli, slender_plate

Rectangle = tuple[float, float, float, float]  # from x, y to x, y


def least_moduli(rectangles: list[Rectangle]) -> tuple[float, float]:
    """1/greatest stress of a unit moment about x alone and y alone, by the principal axes."""
    A = sum((c - a) * (d - b) for a, b, c, d in rectangles)
    x_c = sum((c - a) * (d - b) * (a + c) / 2 for a, b, c, d in rectangles) / A
    y_c = sum((c - a) * (d - b) * (b + d) / 2 for a, b, c, d in rectangles) / A
    tensor = np.zeros((2, 2))
    for a, b, c, d in rectangles:
        w, h, x, y = c - a, d - b, (a + c) / 2 - x_c, (b + d) / 2 - y_c
        own = np.diag([w * w / 12, h * h / 12]) + np.array([[x * x, x * y], [x * y, y * y]])
        tensor += w * h * own
    values, axes = np.linalg.eigh(tensor)
    corners = np.array(
        [(x - x_c, y - y_c) for a, b, c, d in rectangles for x in (a, c) for y in (b, d)]
    )
    along = corners @ axes
    # A moment about x bends with stress in y: its gradient is along y, and so for x.
    stress_x = along @ ((axes.T @ np.array([0.0, 1.0])) / values)
    stress_y = along @ ((axes.T @ np.array([1.0, 0.0])) / values)
    return 1 / np.abs(stress_x).max(), 1 / np.abs(stress_y).max()


SHARP = [
    # An angle stands with its long leg up; a tee has its flange on top; a channel's back is at x=0.
    (
        tl.by_dimensions("angle", b1="150 mm", b2="100 mm", t="12 mm", r1="0 mm", r2="0 mm"),
        [(0, 0, 12, 150), (12, 0, 100, 12)],
    ),
    (
        tl.by_dimensions("angle", b1="100 mm", b2="100 mm", t="10 mm", r1="0 mm", r2="0 mm"),
        [(0, 0, 10, 100), (10, 0, 100, 10)],
    ),
    (
        tl.by_dimensions(
            "channel", d="200 mm", b_f="75 mm", t_f="12 mm", t_w="6 mm", r1="0 mm", r2="0 mm"
        ),
        [(0, 0, 75, 12), (0, 12, 6, 188), (0, 188, 75, 200)],
    ),
    (
        tl.by_dimensions("tee", d="150 mm", b_f="165 mm", t_f="10 mm", t_w="6 mm", r1="0 mm"),
        [(79.5, 0, 85.5, 140), (0, 140, 165, 150)],
    ),
    (
        tl.by_dimensions("I", d="300 mm", b_f="150 mm", t_f="10 mm", t_w="6 mm", r1="0 mm"),
        [(0, 0, 150, 10), (72, 10, 78, 290), (0, 290, 150, 300)],
    ),
    (tl.by_dimensions("flat", b="150 mm", t="12 mm"), [(0, 0, 150, 12)]),
]


@pytest.mark.parametrize(("section", "rectangles"), SHARP, ids=lambda x: getattr(x, "shape", ""))
def test_moduli_of_sharp_corners(section, rectangles):
    assert elastic_moduli(section) == pytest.approx(least_moduli(rectangles), rel=1e-9)


def test_a_flat_by_hand():
    """150x12 lying: about x 150·12²/6 = 3600, about y 12·150²/6 = 45 000 mm³."""
    assert elastic_moduli(tl.section("150x12 FL")) == pytest.approx((3600.0, 45_000.0))


def test_an_angle_bent_about_its_leg_is_worth_less_than_its_table_says():
    """Free to move aside: Z_x = (I_x·I_y - I_xy²)/|I_y·y - I_xy·x|, the least over its corners.

    100x100x10 sharp: A 1900, centroid (1000·5 + 900·55)/1900 = 28.684 from both backs;
    I_x = I_y = 1 800 044, I_xy = -1 065 789 mm⁴ (legs about (5, 50) and (55, 5)).
    """
    section = SHARP[1][0]
    d = 28.684210526
    I_x = 10 * 100**3 / 12 + 1000 * (50 - d) ** 2 + 90 * 10**3 / 12 + 900 * (5 - d) ** 2
    I_xy = 1000 * (5 - d) * (50 - d) + 900 * (55 - d) * (5 - d)
    assert I_x == pytest.approx(1_800_044, abs=1.0)
    assert I_xy == pytest.approx(-1_065_789, abs=1.0)
    stresses = [
        abs(I_x * (y - d) - I_xy * (x - d)) for x, y in [(0, 100), (10, 100), (0, 0), (100, 0)]
    ]
    Z = (I_x**2 - I_xy**2) / max(stresses)
    assert elastic_moduli(section)[0] == pytest.approx(Z, rel=1e-9)
    assert Z < 0.8 * I_x / (100 - d)


@pytest.mark.parametrize(
    "name", ["150x100x12 UA", "150x90x10 UA", "100x100x10 EA", "200 PFC", "310UB40.4"]
)
def test_moduli_of_catalogue_sections_by_finite_elements(name):
    """At most the program's own, whose corners are round; within 4 % of it."""
    pre = pytest.importorskip("sectionproperties.pre.library.steel_sections")
    analysis = pytest.importorskip("sectionproperties.analysis.section")
    section = tl.section(name)
    d = section.dims
    if section.shape == "angle":
        shape = pre.angle_section(d["b1"], d["b2"], d["t"], d["r1"], d["r2"], 12)
    elif section.shape == "channel":
        shape = pre.channel_section(d["d"], d["b_f"], d["t_f"], d["t_w"], d["r1"], 12)
    else:
        shape = pre.i_section(d["d"], d["b_f"], d["t_f"], d["t_w"], d["r1"], 12)
    shape.create_mesh(mesh_sizes=[60.0])
    whole = analysis.Section(shape)
    whole.calculate_geometric_properties()
    found = []
    for moment in ({"mxx": 1e6}, {"myy": 1e6}):
        stress = _bending_stress(whole, **moment)
        found.append(1e6 / stress)
    ours = elastic_moduli(section)
    for own, other in zip(ours, found, strict=True):
        assert 0.96 * other < own < 1.002 * other


def _bending_stress(whole, mxx: float = 0.0, myy: float = 0.0) -> float:
    """Greatest normal stress at the mesh's nodes, from the program's own second moments."""
    x_c, y_c = whole.get_c()
    ixx, iyy, ixy = whole.get_ic()
    nodes = np.asarray(whole.mesh["vertices"]) - np.array([x_c, y_c])
    spread = ixx * iyy - ixy * ixy
    x, y = nodes[:, 0], nodes[:, 1]
    stress = (mxx * (iyy * y - ixy * x) + myy * (ixx * x - ixy * y)) / spread
    return float(np.abs(stress).max())


def test_tubes():
    """114.3x4.8 CHS: π/64·(114.3⁴ - 104.7⁴)/57.15; 100x5 SHS: I over half its side."""
    Z = math.pi / 64 * (114.3**4 - 104.7**4) / 57.15
    assert elastic_moduli(tl.section("114.3x4.8 CHS")) == pytest.approx((Z, Z))
    square = tl.section("100x100x5.0 SHS")
    # Its corners are round: the outermost point off the axes is the flat of the side.
    assert elastic_moduli(square)[0] == pytest.approx(square.I_x / 50.0)


def test_a_round_bar():
    """π·20³/32 = 785.398."""
    bar = tl.section("20 RB")
    assert elastic_moduli(bar) == pytest.approx((math.pi * 20**3 / 32,) * 2)


def test_a_pair_bends_as_one_about_its_own_axes():
    """Two 150x100x12 by their long legs, 12 apart: symmetrical about y, so no product of inertia.

    Z_x = I_x over the farther toe; Z_y = I_y/(100 + 6).
    """
    pair, one = tl.section("2/150x100x12 UA, long legs, gap 12 mm"), tl.section("150x100x12 UA")
    assert pair.I_x == pytest.approx(2 * one.I_x)
    Z_x, Z_y = elastic_moduli(pair)
    y_c = 49.110  # the angle's centroid from its heel, see the test of shares
    assert pytest.approx(2 * one.I_x / (150 - y_c), rel=1e-4) == Z_x
    # From its back: (10 800 + 59 136 + 305.5 - 58.4 - 530.5)/2866.73.
    x_c = 24.297
    I_y = 2 * (one.I_y + one.A * (x_c + 6) ** 2)
    assert pair.I_y == pytest.approx(I_y, rel=1e-4)
    assert pytest.approx(I_y / 106, rel=1e-4) == Z_y


def test_a_pair_by_its_short_legs():
    pair, one = tl.section("2/150x100x12 UA, short legs, gap 12 mm"), tl.section("150x100x12 UA")
    Z_x, Z_y = elastic_moduli(pair)
    assert pytest.approx(pair.I_x / (150 + 6), rel=1e-9) == Z_x
    assert pytest.approx(2 * one.I_y / (100 - 24.297), rel=1e-4) == Z_y


def test_two_channels_back_to_back():
    """Z_x = 2·I_x/100 and Z_y = I_y/(75 + 6) for 2/200 PFC with 12 between."""
    pair, one = tl.section("2/200 PFC, webs, gap 12 mm"), tl.section("200 PFC")
    assert elastic_moduli(pair) == pytest.approx((2 * one.I_x / 100, pair.I_y / 81))


@pytest.mark.parametrize(
    ("name", "plate"),
    [
        ("150x100x12 UA", (138.0, 12.0, "outstand")),
        ("100x100x10 EA", (90.5, 9.5, "outstand")),
        ("200 PFC", (69.0, 12.0, "outstand")),
        ("310UB40.4", (79.45, 10.2, "outstand")),
        ("150x12 FL", None),
        ("114.3x4.8 CHS", (114.3, 4.8, "round")),
        ("200x200x5.0 SHS", (190.0, 5.0, "wall")),
        ("2/150x100x12 UA, long legs, gap 12 mm", (138.0, 12.0, "outstand")),
    ],
)
def test_the_most_slender_plate(name, plate):
    found = slender_plate(tl.section(name))
    if plate is None:
        assert found is None
        return
    *sizes, kind = plate
    assert found[:2] == pytest.approx(sizes)
    assert found[2] == kind


def test_the_outstand_of_a_tee_is_the_more_slender_of_flange_and_stem():
    """79.5/10 = 7.95 against 140/6 = 23.3; with a thin flange 82/4 = 20.5 against 146/8 = 18.3."""
    assert slender_plate(SHARP[3][0]) == (140.0, 6.0, "outstand")
    thin = tl.by_dimensions("tee", d="150 mm", b_f="172 mm", t_f="4 mm", t_w="8 mm", r1="0 mm")
    assert slender_plate(thin) == (82.0, 4.0, "outstand")


def test_the_least_radius_of_one_component():
    """Of a pair, that of one angle: 21.67 for 150x100x12; the pair's own is greater."""
    pair, one = tl.section("2/150x100x12 UA, long legs, gap 12 mm"), tl.section("150x100x12 UA")
    assert component_radius(pair) == pytest.approx(one.r_min)
    assert component_radius(pair) == pytest.approx(21.671, abs=0.001)
    assert pair.r_min > 40.0


def test_a_section_without_an_outline_is_refused():
    own = tl.stated("own", A="2000 mm2", t="10 mm", source="maker")
    with pytest.raises(
        InputError, match="section: own has no outline, .* give a catalogue section"
    ):
        elastic_moduli(own)
