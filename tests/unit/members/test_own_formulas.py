"""A user's own formulas lead a design, and their symbols never stand in for the library's."""

from __future__ import annotations

import pytest

import tensionlib as tl
from tensionlib.errors import InputError
from tensionlib.quantities import FACTOR, FORCE, LENGTH, PRESSURE

OWN = tl.project_notation(
    tl.Symbol("p", "p", PRESSURE, "wind pressure"),
    # Names the standard's notation uses for other things.
    tl.Symbol("b", "b_{w}", LENGTH, "width of the panel"),
    tl.Symbol("d", "d_{w}", LENGTH, "height of the panel"),
    tl.Symbol("k", "k", FACTOR, "share"),
    tl.Symbol("N_star", "N^{*}", FORCE, "design tension force", "N*"),
)


@tl.formula("N_star", OWN, title="tension from wind", clause="statics")
def wind_force(k, p, b, d):
    return k * p * b * d


END = tl.Bolted(
    to="leg",
    bolts="M20 8.8/S",
    threads="in shear plane",
    per_line=2,
    pitch="70 mm",
    gauge="50 mm",
    end_distance="40 mm",
    plate=tl.Gusset("10 mm", "AS/NZS 3678 250"),
)
BRACE = tl.Member("RB3", "100x100x8 EA", "AS/NZS 3679.1 300", "4.6 m", END)


def _wind():
    work = tl.Working("Wind", OWN)
    p = work.given("p", "1.0 kPa", "wind report")
    b, d = work.given("b", "24 m"), work.given("d", "6 m")
    return work, work.step(wind_force, work.given("k", 0.5), p, b, d)


def test_the_working_leads_the_calculation():
    _, N = _wind()
    calc = tl.design(BRACE, N)
    assert calc.value("N*").internal == 72e3
    parts = [part["title"] for part in calc.record()["parts"]]
    assert parts[0] == "Wind"
    line = calc.record()["parts"][0]["lines"][0]
    assert line["text"] == "N* = k·p·b·d = 0.5·1 kPa·24000 mm·6000 mm = 72 kN"
    assert "N* = 72 kN" in calc.headline


def test_checks_equal_those_of_the_same_force_given_plainly():
    _, N = _wind()
    mixed, plain = tl.design(BRACE, N), tl.design(BRACE, "72 kN")
    for one, other in zip(mixed.checks, plain.checks, strict=True):
        assert (one.part, one.name, one.utilisation) == (other.part, other.name, other.utilisation)


def test_the_working_stays_as_it_was_and_serves_two_members():
    work, N = _wind()
    lines = len(work.lines)
    tl.design(BRACE, N)
    again = tl.design(BRACE.but(mark="RB4"), N)
    assert len(work.lines) == lines
    assert again.heading.mark == "RB4"


def test_an_entry_of_another_role_is_refused():
    work, _ = _wind()
    length = work.input("b")
    with pytest.raises(InputError, match="force: got b, a length; a force is due"):
        tl.design(BRACE, length)


def test_a_compression_from_a_working_is_refused():
    work = tl.Working("Wind", OWN)
    N = work.given_number("N_star", -5e3, "given", "N_star")
    with pytest.raises(InputError, match="-5 kN, compression"):
        tl.design(BRACE, N)


def test_a_picture_that_lies_is_an_error_at_first_rendering(monkeypatch):
    """A user's formula is read back from what is shown; a wrong picture never reaches paper."""
    from tensionlib.calculation.readback import ReadbackError
    from tensionlib.calculation.templates import Template

    _, N = _wind()
    calc = tl.design(BRACE, N)
    honest = Template.numeric
    monkeypatch.setattr(
        Template, "numeric", lambda self, values: honest(self, values).replace("0.5", "0.6")
    )
    with pytest.raises(ReadbackError, match="does not hold"):
        calc.record()


def test_a_symbol_that_prints_alike_keeps_both_meanings():
    own = tl.project_notation(
        tl.Symbol("b", "b", LENGTH, "width of the panel"),
        tl.Symbol("q", "q", PRESSURE, "pressure"),
        tl.Symbol("N_star", "N^{*}", FORCE, "design tension force", "N*"),
    )

    @tl.formula("N_star", own, title="tension", clause="statics")
    def panel_force(q, b):
        return q * b * b

    work = tl.Working("Wind", own)
    N = work.step(panel_force, work.given("q", "1 kPa"), work.given("b", "8 m"))
    meanings = {row["meaning"] for row in tl.design(BRACE, N).record()["notation"]}
    assert {"width of the panel", "width, connected element"} <= meanings
