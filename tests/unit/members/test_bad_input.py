"""What the Python API answers to input it cannot take: the error, and what it says."""

from __future__ import annotations

import math

import pytest

import tensionlib as tl
from tensionlib.errors import DataNotFoundError, InputError, UnitError
from tensionlib.quantities import AREA, LENGTH
from tensionlib.steel import by_dimensions, stated
from tensionlib.units import kN, mm
from tests.builders import TUBE_STEEL, bolted, gusset, member, tube, two_lines, welded


def design(section="150x90x10 UA", end=None, force="1 kN", **changes):
    return tl.design(member(section, end, **changes), force)


def thick(t):
    return gusset(thickness=t)


# What is done, the error, and the telling part of its message.
NUMBERS = [
    (lambda: member(length=4000), UnitError, "length: got 4000, a bare number"),
    (lambda: member(length="4 kN"), UnitError, "length: got '4 kN', a force; a length is due"),
    (lambda: member(length="4000"), UnitError, "length: got '4000', a number without a unit"),
    (lambda: member(length="4 metres"), InputError, "'metres' is not a known unit"),
    (lambda: member(length=math.nan * mm), InputError, "length: .* a finite number is due"),
    (lambda: member(length=math.inf * mm), InputError, "length: .* a finite number is due"),
    (lambda: member(length="0 mm"), InputError, "length: got 0 mm; it must be above 0 mm"),
    (lambda: member(length="-4 m"), InputError, "length: got -4000 mm; it must be above"),
    (lambda: member(length=None), UnitError, "length: got nothing"),
    (lambda: member(length=["4 m", "5 m"]), UnitError, "length: got several values"),
    (lambda: member(length=True), UnitError, "length: got True"),
    (lambda: design(force=285), UnitError, "force: got 285, a bare number"),
    (lambda: design(force="285 mm"), UnitError, "force: got '285 mm', a length; a force is due"),
    (lambda: design(force=math.nan * kN), InputError, "force: .* a finite number is due"),
    (lambda: design(force=None), UnitError, "force: got nothing"),
    (lambda: design(force="-20 kN"), InputError, "got -20 kN, compression; .* '285 kN'"),
    (lambda: gusset(thickness=12), UnitError, "thickness: got 12, a bare number"),
    (lambda: gusset(width="0 mm"), InputError, "width: got 0 mm; it must be above 0"),
    (lambda: bolted(pitch=70), UnitError, "pitch: got 70, a bare number"),
    (lambda: bolted(pitch="70 MPa"), UnitError, "pitch: got '70 MPa', a stress"),
    (lambda: bolted(end_distance=math.nan * mm), InputError, "end_distance: .* a finite number"),
    (lambda: bolted(clearance="-1 mm"), InputError, "clearance: got -1 mm; it must be at least 0"),
    (lambda: welded(leg_size=6), UnitError, "leg_size: got 6, a bare number"),
    (lambda: welded(leg_size="0 mm"), InputError, "leg_size: got 0 mm; it must be above"),
    (lambda: welded(length_1="150 mm2"), UnitError, "length_1: got '150 mm2', an area"),
    (lambda: stated("x", A=2000, t="10 mm", source="s"), UnitError, "A: got 2000, a bare number"),
    (lambda: bolted(per_line=0), InputError, "per_line: got 0; it must be at least 1"),
    (lambda: bolted(per_line=2.5), InputError, "per_line: got 2.5; a whole number is due"),
    (lambda: bolted(per_line="3"), UnitError, "per_line: got '3'; a whole number is due"),
    (lambda: bolted(per_line=True), UnitError, "per_line: got True; a whole number is due"),
    (lambda: bolted(lines=3), InputError, "lines: got 3; 1 or 2 lines of bolts are accepted"),
]

NAMES = [
    (lambda: member(mark=" "), InputError, "mark: empty; .* 'RB1'"),
    (lambda: member(mark=3), InputError, "mark: got 3; text is due"),
    (lambda: member("150x90x9 UA"), DataNotFoundError, "Did you mean '150x90x"),
    (lambda: member(125), InputError, "section: got 125; a designation is due"),
    (lambda: member(steel="AS/NZS 3679.1 310"), DataNotFoundError, "Did you mean 'AS/NZS 3679.1"),
    (lambda: member(steel=300), InputError, "steel: got 300; a grade is due"),
    (
        lambda: tl.grade("S275"),
        DataNotFoundError,
        "'S275' is not a grade on offer; there are AS/NZ",
    ),
    (
        lambda: member(end="bolted"),
        InputError,
        r"end: got 'bolted'; an end is due, for example Bolted\(...\)",
    ),
    (lambda: member(far_end="welded"), InputError, "far_end: got 'welded'"),
    (lambda: member().but(lenght="3 m"), InputError, "Did you mean 'length'"),
    (lambda: bolted().but(pich="60 mm"), InputError, "'pich' is not a field; .* 'pitch'"),
    (lambda: tl.design("RB1", "1 kN"), InputError, "member: got 'RB1'"),
    (
        lambda: tl.design(member(), "1 kN", standard="NZS 3405"),
        DataNotFoundError,
        "'NZS 3405' is not on offer; .* Did you mean 'nzs3404'",
    ),
    (lambda: bolted(to="long log"), InputError, "to: got 'long log'; .* Did you mean 'long leg'"),
    (lambda: bolted(threads="in"), InputError, "one of 'in shear plane', 'out of shear plane'"),
    (lambda: bolted(edge_kind="rough"), InputError, "one of 'sheared', 'machine cut', 'rolled'"),
    (lambda: bolted(bolts=20), InputError, "bolts: got 20; .* 'M20 8.8/S'"),
    (lambda: design(end=bolted(bolts="M21 8.8/S")), DataNotFoundError, "sizes are M12, M16, M20"),
    (lambda: bolted(plate="12 mm"), InputError, r"plate: got '12 mm'; .* Gusset\('12 mm'"),
    (lambda: welded(quality="SPP"), InputError, "quality: got 'SPP'; .* Did you mean 'SP'"),
    (lambda: design(end=welded(metal="E49XX")), DataNotFoundError, "Did you mean 'B-E49XX'"),
    (lambda: gusset(steel=250), InputError, "steel: got 250; .* 'AS/NZS 3678 250'"),
    (lambda: design()["bolt sheer"], DataNotFoundError, "Did you mean 'bolt shear'"),
    (lambda: design()["ply bearing and tear-out"], DataNotFoundError, "give the part"),
    (lambda: design().value("phiN_r"), DataNotFoundError, "'phiN_r' is not in the calculation"),
    (lambda: design().shown_in("US"), InputError, "view: got 'US'; give METRIC, US"),
]

MISSING_OR_NOT_DUE = [
    (lambda: bolted(pitch=None), InputError, "pitch: missing; two or more bolts a line"),
    (lambda: bolted(gauge=None), InputError, "gauge: missing; an angle's bolts"),
    (lambda: design("150 PFC", two_lines(to="both flanges")), InputError, "gauge: missing"),
    (lambda: design("150 PFC", bolted(to="web")), InputError, "gauge: 60 mm; .* leave gauge out"),
    (lambda: bolted(lines=2), InputError, "line_spacing: missing; two lines"),
    (lambda: bolted(line_spacing="50 mm"), InputError, "line_spacing: given for one line"),
    (lambda: bolted(stagger="30 mm"), InputError, "stagger: given for one line"),
    (lambda: welded(to="slot"), InputError, "slot_clearance: missing; .* '3 mm'"),
    (lambda: welded(slot_clearance="2 mm"), InputError, "slot_clearance: given for .* 'long leg'"),
    (
        lambda: welded(to="slot", slot_clearance="2 mm", transverse="40 mm"),
        InputError,
        "transverse: given for an end welded to 'slot'",
    ),
    (lambda: welded(k_te=0.8), InputError, "k_te_reason: missing"),
    (lambda: bolted(k_te=0.8, k_te_reason=" "), InputError, "k_te_reason: missing"),
    (lambda: bolted(k_te=0.0, k_te_reason="x"), InputError, "k_te: got 0; it must be above 0"),
    (lambda: bolted(k_te=1.1, k_te_reason="x"), InputError, "k_te: got 1.1; it must be at most 1"),
    (lambda: bolted(k_te="0.8", k_te_reason="x"), UnitError, "k_te: got '0.8'; a plain number"),
]

GEOMETRY = [
    (lambda: design(end=bolted(end_distance="11 mm")), InputError, "end_distance: .* cut the edge"),
    (lambda: design(end=bolted(plate_end_distance="9 mm")), InputError, "plate_end_dist.* cut the"),
    (lambda: design(end=bolted(plate_edge_distance="9 mm")), InputError, "plate_edge_d.* cut the"),
    (lambda: design(end=bolted(pitch="22 mm")), InputError, "pitch: .* overlap; more than 22 mm"),
    (
        lambda: design("150x90x12 UA", bolted(lines=2, line_spacing="22 mm")),
        InputError,
        "line_spacing: .* the two lines would overlap; more than 22 mm",
    ),
    (
        lambda: design("150x90x12 UA", bolted(lines=2, line_spacing="50 mm", stagger="71 mm")),
        InputError,
        "stagger: 71 mm; it is at most the pitch",
    ),
    (lambda: design(end=bolted(gauge="139 mm")), InputError, "leaves the long leg, 150 mm wide"),
    (lambda: design(end=bolted(gauge="20 mm")), InputError, "run into the other leg .* 20.5 mm"),
    (
        lambda: design(end=bolted(lines=2, line_spacing="90 mm")),
        InputError,
        "the hole leaves the long leg, 150 mm wide",
    ),
    (
        lambda: design("65x10 FL", two_lines(to="plate", line_spacing="50 mm")),
        InputError,
        "line_spacing: the hole leaves the plate, which has 65 mm",
    ),
    (
        lambda: design("150 PFC", two_lines(to="web", line_spacing="110 mm")),
        InputError,
        "line_spacing: the hole leaves the web, which has 131 mm",
    ),
    (
        lambda: design("310 UB 40.4", two_lines(to="both flanges", line_spacing="28 mm")),
        InputError,
        "stand either side of the web; .* more than 28.1 mm",
    ),
    (
        lambda: design("155 BT 20.2", bolted(to="flange", gauge=None)),
        InputError,
        "stand either side of the web; give lines=2",
    ),
    (
        lambda: design(end=bolted(to="web", gauge=None)),
        InputError,
        "by its 'long leg', 'short leg'",
    ),
    (lambda: design(end=bolted(to="leg")), InputError, "by its 'long leg', 'short leg'"),
    (
        lambda: design("114.3x4.8 CHS", two_lines(to="plate"), steel=TUBE_STEEL),
        InputError,
        "cannot be bolted in this library; weld tubes",
    ),
    (lambda: design("100x12 FL", welded(to="bar")), InputError, "can be welded by its 'plate'"),
    (
        lambda: design("2/150x90x10 UA, long legs, gap 10 mm"),
        InputError,
        "plate.thickness: got 12 mm in the gap of 2/150x90x10 UA, long legs, gap 10 mm",
    ),
    (
        lambda: design("2/150x90x10 UA, long legs, gap 40 mm"),
        InputError,
        "packing plates are not covered",
    ),
    (
        lambda: design("2/150x90x10 UA, short legs, gap 12 mm"),
        InputError,
        "face the gusset by their short leg",
    ),
    (lambda: tl.section("2/150 PFC, webs, gap 12"), UnitError, "gap: got '12', a number without"),
    (
        lambda: design(stated("tie", A="2000 mm2", t="10 mm", source="s"), two_lines(to="plate")),
        InputError,
        "tie states no b; give it with its unit",
    ),
    (
        lambda: by_dimensions("angle", b1="90 mm", b2="100 mm", t="8 mm"),
        InputError,
        "b2: got 100 mm; .* the long leg b1",
    ),
]

STEEL = [
    (lambda: design(steel="AS/NZS 3678 250"), InputError, "is not made as angle; for example 'AS"),
    (lambda: design(steel=TUBE_STEEL), InputError, "AS/NZS 1163 C350 is not made as angle"),
    (
        lambda: design("114.3x4.8 CHS", tube().end),
        InputError,
        "AS/NZS 3679.1 300 is not made as CHS; for example 'AS/NZS 1163",
    ),
    (
        lambda: design(end=bolted(plate=gusset(steel="AS/NZS 3679.1 300"))),
        InputError,
        "is not made as plate; for example 'AS/NZS 3678 250'",
    ),
    (
        lambda: design(end=bolted(plate=gusset(steel="AS/NZS 3678 260"))),
        DataNotFoundError,
        "Did you mean 'AS/NZS 3678 250'",
    ),
    (lambda: design(end=bolted(plate=thick("151 mm"))), InputError, "the table ends at 150 mm"),
]

OWN = tl.project_notation(
    tl.Symbol("b", "b", LENGTH, "width"),
    tl.Symbol("t", "t", LENGTH, "thickness"),
    tl.Symbol("A", "A", AREA, "area"),
)


@tl.formula("A", OWN, title="area")
def area(b, t):
    return b * t


def working():
    work = tl.Working("Plate", OWN)
    return work, work.given("b", "100 mm"), work.given("t", "12 mm")


def _again():
    work, _, _ = working()
    return work.given("b", "90 mm")


def _arithmetic():
    _, b, t = working()
    return b * t


def _truth():
    _, b, _ = working()
    return 1 if b else 0


def _two_workings():
    work, b, _ = working()
    return work.step(area, b, working()[2])


def _wrong_role():
    work, b, t = working()
    return work.step(area, work.step(area, b, t), t)


WORKING = [
    (lambda: working()[0].given("t", 12, key="t2"), UnitError, "t: got 12, a bare number"),
    (lambda: working()[0].given("q", "1 mm"), DataNotFoundError, "'q'"),
    (_again, InputError, "input 'b' stands twice"),
    (_arithmetic, InputError, "b: an entry has no arithmetic and no truth value"),
    (_truth, InputError, "b: an entry has no arithmetic and no truth value"),
    (_two_workings, InputError, "t belongs to another working"),
    (_wrong_role, InputError, "area: b is a length, got A, a area"),
    (lambda: working()[0].step(area, working()[1]), InputError, "got 1 entries; 2 are due: b, t"),
    (lambda: tl.design(member(), working()[1]), InputError, "force: got b, a length; a force"),
]


@pytest.mark.parametrize(
    ("attempt", "error", "says"),
    [
        pytest.param(*case, id=f"{name}-{i}")
        for name, cases in (
            ("numbers", NUMBERS),
            ("names", NAMES),
            ("due", MISSING_OR_NOT_DUE),
            ("geometry", GEOMETRY),
            ("steel", STEEL),
            ("working", WORKING),
        )
        for i, case in enumerate(cases)
    ],
)
def test_refused(attempt, error, says):
    with pytest.raises(error, match=says) as caught:
        attempt()
    assert type(caught.value) is error
