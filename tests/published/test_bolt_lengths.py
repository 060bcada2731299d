"""Thread, grip and shank of hexagon bolts as ISO 4014 lists them, from memory of the source."""

from __future__ import annotations

import pytest

from tensionlib.steel.bolt_lengths import shank_length, thread_length
from tensionlib.steel.bolts import SIZES
from tests.printed import agrees


@pytest.mark.parametrize(
    ("size", "up_to_125", "up_to_200", "above"),
    [
        ("M16", "38", "44", "57"),
        ("M20", "46", "52", "65"),
        ("M24", "54", "60", "73"),
        ("M30", "66", "72", "85"),
        ("M36", "78", "84", "97"),
    ],
)
def test_thread_lengths(size: str, up_to_125: str, up_to_200: str, above: str) -> None:
    """ISO 4014, reference thread length b, from memory of the source."""
    d_f = SIZES[size].d_f
    assert agrees(thread_length(d_f, 125.0), up_to_125)
    assert agrees(thread_length(d_f, 200.0), up_to_200)
    assert agrees(thread_length(d_f, 220.0), above)


@pytest.mark.parametrize(
    ("size", "length", "shank", "grip"),
    [
        ("M12", 50.0, "11.25", "20"),
        ("M16", 65.0, "17", "27"),
        ("M20", 80.0, "21.5", "34"),
        ("M24", 90.0, "21", "36"),
        ("M30", 110.0, "26.5", "44"),
        ("M36", 140.0, "36", "56"),
    ],
)
def test_least_shank_and_greatest_grip(size: str, length: float, shank: str, grip: str) -> None:
    """ISO 4014, least l_s and greatest l_g of each size's shortest bolt, from memory of the
    source."""
    assert agrees(shank_length(size, length), shank)
    assert agrees(length - thread_length(SIZES[size].d_f, length), grip)
