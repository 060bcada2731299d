"""A regular end and the same holes as points: the closed forms and the search agree."""

from __future__ import annotations

import math

from hypothesis import assume, given, settings
from hypothesis import strategies as st

import tensionlib as tl
from tensionlib.joints.pattern_end import as_pattern
from tests.builders import bolted, gusset, member

NET = "net section rupture"


def _capacity(calc, part: str, *names: str) -> float:
    return min(calc[part, name].capacity.internal for name in names)


def _blocks(calc, part: str) -> list[str]:
    return [c.name for c in calc if c.part == part and c.name.startswith("block shear")]


@settings(max_examples=150, deadline=None, derandomize=True)
@given(
    section=st.sampled_from(["150x90x10 UA", "150x100x12 UA", "150x12 FL", "200x20 FL"]),
    per_line=st.integers(1, 5),
    lines=st.integers(1, 2),
    pitch=st.integers(55, 90),
    end=st.integers(30, 60),
    spacing=st.integers(50, 70),
    staggered=st.booleans(),
    side=st.sampled_from([None, 40, 60]),
)
def test_the_search_agrees_with_the_closed_forms(
    section, per_line, lines, pitch, end, spacing, staggered, side
):
    angle = section.endswith("UA")
    regular = bolted(
        to="long leg" if angle else "plate",
        per_line=per_line,
        lines=lines,
        pitch=f"{pitch} mm",
        gauge="55 mm" if angle else None,
        end_distance=f"{end} mm",
        line_spacing=f"{spacing} mm" if lines == 2 else None,
        stagger=f"{pitch // 2} mm" if lines == 2 and staggered else None,
        plate_edge_distance=None if side is None else f"{side} mm",
        plate=gusset(width="260 mm"),
    )
    tie = member(section, regular)
    closed = tl.design(tie, "100 kN")
    found = tl.design(tie.but(end=as_pattern(regular, tie.profile)), "100 kN")

    def same(part: str, name: str, *others: str) -> None:
        assert math.isclose(
            _capacity(closed, part, name),
            _capacity(found, part, *(others or (name,))),
            rel_tol=1e-9,
        )

    same("Net section", NET)
    same("Gusset", "yield")
    bolts = per_line * lines
    for part in ("Member at the bolts", "Gusset"):
        one = _capacity(found, part, "ply bearing, most loaded bolt", "ply tear-out, worst bolt")
        if not (lines == 2 and staggered):
            # The closed form takes every bolt at the value of the weakest; so does a stagger, but
            # its own end bolt may stand nearer the gusset's edge than the pattern's.
            assert math.isclose(
                _capacity(closed, part, "ply bearing and tear-out"), one * bolts, rel_tol=1e-9
            )
    for part in ("Member at the bolts", "Gusset"):
        names = _blocks(closed, part)
        assume(names or not _blocks(found, part))
        if names:
            (block,) = _blocks(found, part)
            check = found[part, block]
            least = min(closed[part, name].capacity.internal for name in names)
            share = (
                check.demand.internal
                / found["Bolts", "bolt shear, most loaded bolt"].demand.internal
            )
            whole = check.capacity.internal / (share / bolts)
            # The search knows every block of the closed forms, and more.
            assert whole <= least * (1 + 1e-9) or (lines == 2 and staggered)
            if lines == 1:
                assert math.isclose(whole, least, rel_tol=1e-9) or share < bolts
