"""Input that is taken and judged, where another would have been refused."""

from __future__ import annotations

import pytest

import tensionlib as tl
from tests.builders import bolted, member


def test_zero_force_is_no_demand():
    """The member has no demand; its connection still has the least design action."""
    calc = tl.design(member(), "0 kN")
    assert calc["gross section yield"].verdict == "no demand"
    assert calc["net section rupture"].utilisation == 0.0
    assert calc["bolt shear"].verdict == "pass"
    assert calc["bolt shear"].demand.internal > 0.0
    assert calc.word == "PASS"


@pytest.mark.parametrize(
    ("section", "end", "check", "clause"),
    [
        (
            "150x90x10 UA",
            {"end_distance": "30 mm", "plate_end_distance": "40 mm"},
            "least end distance, member",
            "Table 9.6.2",
        ),
        ("150x90x10 UA", {"plate_end_distance": "30 mm"}, "least end distance, gusset", "9.6.2"),
        ("150x90x10 UA", {"plate_edge_distance": "30 mm"}, "least edge distance, gusset", "9.6.2"),
        ("150x90x10 UA", {"gauge": "126 mm"}, "least edge distance, member", "Table 9.6.2"),
        ("150x90x10 UA", {"pitch": "45 mm"}, "least pitch", "9.6.1"),
        ("150x90x10 UA", {"pitch": "143 mm"}, "greatest pitch", "9.6.3"),
        ("150x90x10 UA", {"end_distance": "115 mm"}, "greatest end distance, member", "9.6.4"),
        (
            "150x90x12 UA",
            {"lines": 2, "line_spacing": "45 mm"},
            "least distance between lines",
            "9.6.1",
        ),
    ],
)
def test_broken_limit_runs_and_fails_its_check(section, end, check, clause):
    """A distance below the clause's, but on the part, is judged and not refused."""
    calc = tl.design(member(section, bolted(**end)), "20 kN")
    broken = [c.name for c in calc.checks if c.kind == "detailing" and not c.passes]
    assert broken == [check]
    assert calc[check].verdict == "fail"
    assert clause in calc[check].clause
    assert calc.word == "FAIL"
    assert calc.governing.name == check
    assert check in calc.headline
