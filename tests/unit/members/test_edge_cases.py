"""Cases at the edge of what is accepted, each of which was once answered wrongly."""

from __future__ import annotations

import pytest

import tensionlib as tl
from tensionlib.errors import InputError, UnitError
from tests.builders import bolted, gusset, member, welded


@pytest.mark.parametrize(
    ("make", "field"),
    [
        (gusset, "thickness"),
        (bolted, "end_distance"),
        (welded, "leg_size"),
        (welded, "length_1"),
    ],
)
def test_a_length_that_is_due_is_asked_for(make, field):
    with pytest.raises(UnitError, match=f"{field}: got nothing"):
        make(**{field: None})


def test_design_refuses_a_view_that_is_none():
    with pytest.raises(InputError, match="view: got 'US'; give METRIC, US"):
        tl.design(member(), "100 kN", view="US")


def test_two_staggered_single_bolts_may_stand_close_across_the_force():
    """Stagger 60 and spacing 20 put holes of 22 mm 63 mm apart."""
    end = bolted(
        per_line=1, pitch=None, lines=2, line_spacing="20 mm", stagger="60 mm", gauge="50 mm"
    )
    calc = tl.design(member("150x90x12 UA", end), "1 kN")
    assert calc["least distance between lines"].passes


def test_an_equal_angle_has_no_short_leg():
    """By either leg it is the same angle: refused, or the same k_te as by its 'leg'."""
    end = bolted(to="leg", gauge="55 mm")
    by_leg = tl.design(member("100x100x8 EA", end), "100 kN")
    by_short = tl.design(member("100x100x8 EA", end.but(to="short leg")), "100 kN")
    assert by_short.value("k_te").internal == by_leg.value("k_te").internal
