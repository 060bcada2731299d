"""A sheet filled again gives what a fresh walk gives, bit for bit, on every way through it."""

from __future__ import annotations

import random

import pytest

import tensionlib as tl
from tensionlib.errors import InputError
from tensionlib.members import book


def _random_member(rng: random.Random) -> tl.Member:
    section = rng.choice(["150x90x10 UA", "150x100x12 UA", "150x90x16 UA", "150x90x8 UA"])
    per_line = rng.choice([1, 2, 3, 6, 20])
    end = tl.Bolted(
        to="long leg",
        bolts=rng.choice(["M16 8.8/S", "M20 8.8/S", "M24 8.8/TB", "M20 4.6/S"]),
        threads=rng.choice(["in shear plane", "out of shear plane"]),
        per_line=per_line,
        pitch="75 mm" if per_line > 1 else None,
        gauge="65 mm",
        end_distance=f"{rng.choice([30, 40, 55])} mm",
        plate=tl.Gusset(
            f"{rng.choice([8, 10, 12, 20])} mm",
            "AS/NZS 3678 250",
            rng.choice([None, "200 mm"]),
        ),
    )
    return tl.Member("M", section, "AS/NZS 3679.1 300", "4 m", end)


def test_filled_again_equals_walked_afresh():
    rng = random.Random(7)
    seen = set()
    for _ in range(300):
        member, force = _random_member(rng), f"{rng.uniform(0, 500)!r} kN"
        again = tl.design(member, force)
        book._BOOK.clear()
        fresh = tl.design(member, force)
        assert again.values == fresh.values
        assert again.sheet == fresh.sheet
        assert again.origins == fresh.origins
        assert again.record() == fresh.record()
        seen.add(id(again.sheet))
        for _ in range(3):
            tl.design(_random_member(rng), "100 kN")
    assert len(seen) > 20


def test_a_condition_that_turns_out_otherwise_is_walked():
    member = _random_member(random.Random(1))
    end = member.end.but(per_line=2, pitch="75 mm")
    short = tl.design(member.but(end=end), "100 kN")
    long = tl.design(member.but(end=end.but(per_line=6)), "100 kN")
    assert short.value("k_r").internal == 1.0
    assert long.value("k_r").internal == pytest.approx(1.075 - 375.0 / 4000.0)
    assert short.sheet != long.sheet


def test_a_table_that_ends_is_refused_whether_or_not_the_sheet_is_known():
    member = _random_member(random.Random(2))
    thick = member.end.but(plate=tl.Gusset("160 mm", "AS/NZS 3678 250"))
    tl.design(member, "100 kN")
    for _ in range(2):
        with pytest.raises(InputError, match="got 160 mm; the table ends at 150 mm"):
            tl.design(member.but(end=thick), "100 kN")


def test_the_book_does_not_grow_without_end(monkeypatch):
    monkeypatch.setattr(book, "_MOST_CASES", 3)
    book._BOOK.clear()
    member = _random_member(random.Random(3))
    for threads in ("in shear plane", "out of shear plane"):
        for per_line in (1, 2):
            pitch = "75 mm" if per_line > 1 else None
            end = member.end.but(threads=threads, per_line=per_line, pitch=pitch)
            tl.design(member.but(end=end), "100 kN")
    assert len(book._BOOK) == 3
