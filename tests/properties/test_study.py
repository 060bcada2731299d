"""Every row of a study is its single design, bit for bit: thousands of random alternatives."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

import tensionlib as tl
from tensionlib.errors import TensionlibError
from tensionlib.whatif.study import Study

PLATE = tl.Gusset("12 mm", "AS/NZS 3678 250")
STANDARDS = ["NZS 3404", "AS 4100", "AS 4100:1998"]
FORCES = ["0 kN", "60 kN", "140 kN", "290 kN", "455.5 kN", "900 kN"]
STEELS = ["AS/NZS 3679.1 300", "AS/NZS 3679.1 350"]
ANGLES = ["90x90x8 EA", "100x100x10 EA", "150x90x10 UA", "150x100x12 UA", "200x200x18 EA"]
BOLTS = ["M16 4.6/S", "M16 8.8/S", "M20 8.8/TB", "M20 8.8/TF", "M24 8.8/S", "M30 10.9/S"]


def bolted(**more: Any) -> tl.Bolted:
    fields: dict[str, Any] = {
        "to": "long leg",
        "bolts": "M20 8.8/S",
        "threads": "in shear plane",
        "per_line": 3,
        "pitch": "70 mm",
        "gauge": "55 mm",
        "end_distance": "40 mm",
        "plate": PLATE,
    }
    return tl.Bolted(**(fields | more))


def member(end: Any, section: str = "150x90x10 UA", **more: Any) -> tl.Member:
    return tl.Member("T1", section, "AS/NZS 3679.1 300", "4.2 m", end, **more)


def welded(**more: Any) -> tl.Welded:
    fields: dict[str, Any] = {
        "to": "long leg",
        "leg_size": "6 mm",
        "length_1": "150 mm",
        "plate": PLATE,
    }
    return tl.Welded(**(fields | more))


def one_line() -> Study:
    return tl.study(
        member(bolted()),
        {
            "section": ANGLES,
            "end.to": ["long leg", "short leg"],
            "standard": STANDARDS,
            "bolts": BOLTS,
            "threads": ["in shear plane", "out of shear plane"],
            "per_line": [1, 2, 3, 6],
            "pitch": ["45 mm", "70 mm", "110 mm", "75.5 mm"],
            "gauge": ["30 mm", "55 mm", "71 mm"],
            "end_distance": ["12 mm", "28 mm", "40 mm", "170 mm"],
            "thickness": ["6 mm", "12 mm", "25 mm"],
            "force": FORCES,
        },
        force="1 kN",
    )


def two_lines() -> Study:
    base = member(bolted(lines=2, line_spacing="60 mm"), "200x200x18 EA")
    return tl.study(
        base,
        {
            "section": ["200x200x18 EA", "200x200x13 EA", "150x150x12 EA"],
            "standard": STANDARDS,
            "bolts": BOLTS,
            "lines": [1, 2],
            "per_line": [1, 2, 4],
            "pitch": ["60 mm", "90 mm"],
            "line_spacing": ["25 mm", "60 mm", "85 mm"],
            "stagger": ["0 mm", "30 mm", "45 mm", "80 mm"],
            "gauge": ["55 mm", "70 mm", "110 mm"],
            "plate_edge_distance": [None, "15 mm", "45 mm"],
            "plate_end_distance": [None, "38 mm"],
            "edge_kind": ["sheared", "rolled"],
            "plate.width": [None, "160 mm", "300 mm"],
            "force": FORCES,
        },
        force="1 kN",
    )


def other_sections() -> Study:
    ends = {
        "2/150x90x10 UA, long legs, gap 12 mm": bolted(),
        "250 PFC": bolted(to="web", gauge=None, lines=2, line_spacing="100 mm"),
        "150x16 FL": bolted(to="plate", gauge=None, lines=2, line_spacing="70 mm"),
        "310UB46.2": bolted(to="both flanges", gauge=None, lines=2, line_spacing="90 mm"),
        "200UC52.2": bolted(to="web", gauge=None),
    }
    rows = [(section, end) for section, end in ends.items()]
    return tl.study(
        member(bolted()),
        {
            ("section", "end"): rows,
            "standard": STANDARDS,
            "end.bolts": BOLTS,
            "end.per_line": [2, 3, 5],
            "end.pitch": ["55 mm", "80 mm"],
            "end.packing": [None, "4 mm", "10 mm"],
            "end.clearance": [None, "3 mm"],
            "end.slip_factor": [0.2, 0.35],
            "service": [None, "80 kN"],
            "force": FORCES,
        },
        force="1 kN",
    )


def welds() -> Study:
    return tl.study(
        member(welded()),
        {
            "section": [*ANGLES, "2/150x90x10 UA, long legs, gap 12 mm"],
            "standard": STANDARDS,
            "leg_size": ["3 mm", "6 mm", "10 mm", "15 mm"],
            "length_1": ["20 mm", "90 mm", "300 mm", "1200 mm"],
            "transverse": [None, "90 mm"],
            "quality": ["SP", "GP"],
            "metal": ["E41XX", "E48XX"],
            "k_te": [None],
            "thickness": ["6 mm", "12 mm"],
            "plate.width": [None, "200 mm"],
            "plate.compression": [None, "90 kN"],
            "plate.free_length": [None, "180 mm"],
            "force": FORCES,
        },
        force="1 kN",
    )


def tubes() -> Study:
    slot = welded(to="slot", slot_clearance="3 mm")
    return tl.study(
        tl.Member("T1", "114.3x4.8 CHS", "AS/NZS 1163 C350", "4.2 m", slot),
        {
            "section": ["114.3x4.8 CHS", "168.3x6.4 CHS", "100x100x6.0 SHS", "150x100x6.0 RHS"],
            "steel": ["AS/NZS 1163 C350", "AS/NZS 1163 C450"],
            "standard": STANDARDS,
            "shear_lag_by_length": [True, False],
            "slot_clearance": ["0 mm", "3 mm"],
            "length_1": ["80 mm", "160 mm", "300 mm"],
            "leg_size": ["5 mm", "8 mm"],
            "force": FORCES,
        },
        force="1 kN",
    )


def two_ends() -> Study:
    return tl.study(
        member(bolted(), far_end=welded()),
        {
            "section": ANGLES,
            "steel": STEELS,
            "standard": STANDARDS,
            "end.bolts": BOLTS,
            "end.per_line": [1, 2, 4],
            "far_end.leg_size": ["4 mm", "6 mm"],
            "far_end.length_1": ["90 mm", "260 mm"],
            "length": ["1 m", "9 m"],
            "force": FORCES,
        },
        force="1 kN",
    )


def maybe_the_same_ends() -> Study:
    return tl.study(
        member(bolted(), far_end=bolted(pitch="80 mm")),
        {
            "end.pitch": ["70 mm", "80 mm"],
            "end.per_line": [2, 3],
            "far_end.per_line": [2, 3],
            "standard": STANDARDS,
            "force": FORCES[1:4],
        },
        force="1 kN",
    )


def beside() -> Study:
    bent = [None, tl.Across(offset_y="15 mm"), tl.Across(load="0.4 kN/m", sag_limit="12 mm")]
    seismic = [None, *(tl.Overstrength(category=c) for c in "134")]
    return tl.study(
        member(bolted(per_line=4)),
        {
            "section": ANGLES,
            "standard": STANDARDS,
            "across": bent,
            "overstrength": seismic,
            "service": [None, "120 kN"],
            "length": ["2 m", "6.5 m"],
            "bolts": BOLTS,
            "force": FORCES,
        },
        force="1 kN",
    )


def mixed_ends() -> Study:
    shape = tl.GussetShape(
        corners=[("0 mm", "0 mm"), ("420 mm", "0 mm"), ("420 mm", "260 mm"), ("0 mm", "320 mm")],
        supported=[0],
        member_at=("210 mm", "150 mm"),
        angle="50 deg",
    )
    tie = member(bolted())
    ends = [
        bolted(),
        bolted(plate=tl.Gusset("12 mm", "AS/NZS 3678 250", shape=shape)),
        welded(),
        tl.as_pattern(bolted(), tie.profile).but(share="elastic"),
        bolted(to="short leg", gauge="50 mm", k_te=0.8, k_te_reason="tested"),
    ]
    return tl.study(
        tie,
        {"section": ANGLES[2:4], "end": ends, "standard": STANDARDS, "force": FORCES},
        force="1 kN",
    )


STUDIES: list[tuple[Callable[[], Study], int]] = [
    (one_line, 450),
    (two_lines, 450),
    (other_sections, 300),
    (welds, 300),
    (tubes, 200),
    (two_ends, 200),
    (maybe_the_same_ends, 72),
    (beside, 250),
    (mixed_ends, 150),
]


def design_alone(study: Study, row: int) -> tuple[tl.Calculation | None, str]:
    """A row's single design, or why there is none."""
    try:
        brief = study.brief(row)
        made = tl.design(brief.member, brief.force, standard=brief.standard, service=brief.service)
    except TensionlibError as error:
        return None, str(error)
    return made, ""


@pytest.mark.parametrize(("make", "rows"), STUDIES, ids=[make.__name__ for make, _ in STUDIES])
def test_each_row_is_its_single_design(make: Callable[[], Study], rows: int) -> None:
    study = make()
    rng = np.random.default_rng(len(study))
    seen = set()
    for row in rng.permutation(len(study))[:rows]:
        row = int(row)
        alone, refused = design_alone(study, row)
        if alone is None:
            assert study.word(row) == "CANNOT BE BUILT", refused
            assert np.isnan(study.utilisation[row])
            assert study.why(row) == refused
            seen.add("CANNOT BE BUILT")
            continue
        assert study.word(row) == alone.word
        assert study.utilisation[row] == alone.utilisation
        check = alone.governing
        assert check is not None
        assert study.governing(row) == (check.part, check.name)
        assert bool(study.passes[row]) is alone.passes
        seen.add(alone.word)
    assert len(seen) > 1


def test_two_thousand_rows_are_compared() -> None:
    assert sum(rows for _, rows in STUDIES) >= 2000


def test_a_row_stated_by_hand_is_the_same() -> None:
    """A row's member built here from its values, not by the study."""
    study = one_line()
    rng = np.random.default_rng(7)
    compared = 0
    for row in rng.integers(0, len(study), 60):
        has = study.pick(int(row))
        try:
            end = bolted(
                to=has["end.to"],
                bolts=has["end.bolts"],
                threads=has["end.threads"],
                per_line=has["end.per_line"],
                pitch=has["end.pitch"],
                gauge=has["end.gauge"],
                end_distance=has["end.end_distance"],
                plate=tl.Gusset(has["end.plate.thickness"], "AS/NZS 3678 250"),
            )
            alone = tl.design(member(end, has["section"]), has["force"], standard=has["standard"])
        except TensionlibError:
            continue
        assert study.utilisation[row] == alone.utilisation
        compared += 1
    assert compared > 30
