"""AS 4100 beside NZS 3404: what is the same, what differs, and how each edition numbers it."""

from __future__ import annotations

import pytest

import tensionlib as tl
from tensionlib.errors import DataNotFoundError
from tensionlib.standards import names, standard
from tensionlib.standards.as4100.notation import renumbered
from tests.builders import bolted, member, two_lines, welded


def test_common_folders_are_no_standards():
    assert names() == ("as4100", "nzs3404")


@pytest.mark.parametrize(
    ("name", "edition"),
    [
        ("AS 4100", "2020"),
        ("AS 4100:2020", "2020"),
        ("as4100-1998", "1998"),
        ("NZS 3404", "1997"),
        ("NZS 3404:Part 1:1997", "1997"),
    ],
)
def test_editions_by_name(name, edition):
    assert standard(name).edition == edition


def test_an_edition_that_is_not_on_offer_lists_those_that_are():
    with pytest.raises(DataNotFoundError, match=r"editions 1998, 2020"):
        standard("AS 4100:1990")


@pytest.mark.parametrize(
    ("of_1998", "of_2020"),
    [
        ("9.3.2.1", "9.2.2.1"),
        ("9.4", "9.3"),
        ("Table 9.6.2", "Table 9.5.2"),
        ("9.7.3.10", "9.6.3.10"),
        ("9.1.10", "9.1.10"),
        ("9.1.4", "9.1.4"),
        ("7.2", "7.2"),
        ("Table 7.3.2", "Table 7.3.2"),
        ("14.3.5.2", "14.3.5.2"),
        ("practice", "practice"),
    ],
)
def test_renumbering(of_1998, of_2020):
    assert renumbered(of_1998) == of_2020


@pytest.mark.parametrize(
    "end", [bolted(), bolted(plate=tl.Gusset("20 mm", "AS/NZS 3678 250")), welded()]
)
def test_both_standards_and_editions_give_the_same_numbers(end):
    """Outside earthquake the two agree on what the walk covers; clause numbers differ."""
    calcs = [
        tl.design(member(end=end), "250 kN", standard=name)
        for name in ("NZS 3404", "AS 4100:1998", "AS 4100:2020")
    ]
    numbers = [[(c.part, c.name, c.utilisation) for c in calc] for calc in calcs]
    assert numbers[0] == numbers[1] == numbers[2]


def test_each_prints_its_own_symbols_and_clauses():
    nzs, old, new = (
        tl.design(member(end=bolted()), "250 kN", standard=name).text()
        for name in ("NZS 3404", "AS 4100:1998", "AS 4100:2020")
    )
    assert "k_te" in nzs
    assert "C_1" in nzs
    assert "k_te" not in old
    assert "C_1" not in old
    assert "3.2·d_f·t·f_u" in old
    assert "9.3.2.1" in old
    assert "9.3.2.1" not in new
    assert "9.2.2.1" in new
    assert "9.6.2" not in new
    assert "AS 4100:2020" in new


def test_block_shear_is_a_clause_of_as4100_and_practice_in_nzs3404():
    flat = member("150x12 FL", two_lines(to="plate"))
    assert tl.design(flat, "200 kN", standard="AS 4100")[
        "Gusset", "block shear, between the lines"
    ].clause == ("9.1.9")
    assert tl.design(flat, "200 kN")["Gusset", "block shear, between the lines"].clause == (
        "practice"
    )


def test_bolts_of_class_10_9_came_with_2020():
    """0.83·0.62·1040·225 with threads in the shear plane; nothing off the shank; fairly sure."""
    end = bolted(bolts="M20 10.9/S")
    new = tl.design(member(end=end), "250 kN", standard="AS 4100:2020")
    assert new["bolt shear"].capacity.internal == pytest.approx(0.8 * 3 * 0.83 * 0.62 * 1040 * 225)
    shank = tl.design(
        member(end=end.but(threads="out of shear plane")), "250 kN", standard="AS 4100"
    )
    assert shank["bolt shear"].capacity.internal == pytest.approx(0.8 * 3 * 0.62 * 1040 * 314)
    for older in ("AS 4100:1998", "NZS 3404"):
        calc = tl.design(member(end=end), "250 kN", standard=older)
        assert [line.title for line in calc.not_covered] == ["bolts of class 10.9"]
