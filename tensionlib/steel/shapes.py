"""The outlines of the shapes, from their dimensions in mm.

Axes: x to the right, y up. An angle stands with its heel at the origin, the short leg b2 along x
and the long leg b1 along y. A channel stands with its back along y at x = 0; an I stands upright
about y; a tee has its flange on top at y = d and its stem below. A flat lies with its width along
x. Tubes and bars are centred at the origin.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping

from tensionlib.errors import InputError
from tensionlib.steel.outline import Circle, Corner, Outline

Dims = Mapping[str, float]

DIMENSIONS: dict[str, tuple[str, ...]] = {
    "angle": ("b1", "b2", "t", "r1", "r2"),
    "channel": ("d", "b_f", "t_f", "t_w", "r1", "r2"),
    "I": ("d", "b_f", "t_f", "t_w", "r1"),
    "tee": ("d", "b_f", "t_f", "t_w", "r1"),
    "flat": ("b", "t"),
    "round": ("d",),
    "CHS": ("d", "t"),
    "RHS": ("d", "b", "t", "r_ext"),
}
_RADII = ("r1", "r2", "r_ext")


def outline(shape: str, dims: Dims) -> Outline:
    """The outline of a shape.

    Raises
    ------
    InputError
        For dimensions that do not make the shape: naming the dimension and what it must be.
    """
    check(shape, dims)
    return _MAKERS[shape](dims)


def check(shape: str, dims: Dims) -> None:
    """Refuse dimensions that do not make the shape."""
    for name in DIMENSIONS[shape]:
        value = dims[name]
        if value < 0.0 or (value == 0.0 and name not in _RADII):
            raise InputError(f"{name}: got {value:g} mm; more than zero is due for the {shape}")
    for name, below, of in _LIMITS.get(shape, ()):
        most = below(dims)
        if dims[name] >= most:
            raise InputError(
                f"{name}: got {dims[name]:g} mm; less than {most:g} mm, {of}, makes the {shape}"
            )


# For each shape: a dimension, what it must stay below, and what that is in words.
_LIMITS: dict[str, tuple[tuple[str, Callable[[Dims], float], str], ...]] = {
    "angle": (
        ("b2", lambda d: d["b1"] + 1e-9, "the long leg b1"),
        ("t", lambda d: d["b2"], "the short leg"),
        ("r2", lambda d: d["t"] + 1e-9, "the thickness"),
        ("r1", lambda d: d["b2"] - d["t"] - d["r2"] + 1e-9, "what the short leg leaves"),
    ),
    "channel": (
        ("t_w", lambda d: d["b_f"], "the flange width"),
        ("t_f", lambda d: d["d"] / 2, "half the depth"),
        ("r2", lambda d: d["t_f"] + 1e-9, "the flange thickness"),
        ("r1", lambda d: d["b_f"] - d["t_w"] - d["r2"] + 1e-9, "what the flange leaves"),
        ("r1", lambda d: d["d"] / 2 - d["t_f"] + 1e-9, "half of what the flanges leave"),
    ),
    "I": (
        ("t_w", lambda d: d["b_f"], "the flange width"),
        ("t_f", lambda d: d["d"] / 2, "half the depth"),
        ("r1", lambda d: (d["b_f"] - d["t_w"]) / 2 + 1e-9, "what the flange leaves"),
        ("r1", lambda d: d["d"] / 2 - d["t_f"] + 1e-9, "half of what the flanges leave"),
    ),
    "tee": (
        ("t_w", lambda d: d["b_f"], "the flange width"),
        ("t_f", lambda d: d["d"], "the depth"),
        ("r1", lambda d: (d["b_f"] - d["t_w"]) / 2 + 1e-9, "what the flange leaves"),
        ("r1", lambda d: d["d"] - d["t_f"] + 1e-9, "what the flange leaves of the depth"),
    ),
    "flat": (("t", lambda d: d["b"] + 1e-9, "the width"),),
    "CHS": (("t", lambda d: d["d"] / 2, "the radius"),),
    "RHS": (
        ("t", lambda d: min(d["b"], d["d"]) / 2, "half the smaller side"),
        ("r_ext", lambda d: min(d["b"], d["d"]) / 2 + 1e-9, "half the smaller side"),
    ),
}


def _angle(d: Dims) -> Outline:
    b1, b2, t = d["b1"], d["b2"], d["t"]
    return Outline(
        (
            Corner(0.0, 0.0),
            Corner(b2, 0.0),
            Corner(b2, t, d["r2"]),
            Corner(t, t, d["r1"]),
            Corner(t, b1, d["r2"]),
            Corner(0.0, b1),
        )
    )


def _channel(d: Dims) -> Outline:
    h, b, t, w = d["d"], d["b_f"], d["t_f"], d["t_w"]
    return Outline(
        (
            Corner(0.0, 0.0),
            Corner(b, 0.0),
            Corner(b, t, d["r2"]),
            Corner(w, t, d["r1"]),
            Corner(w, h - t, d["r1"]),
            Corner(b, h - t, d["r2"]),
            Corner(b, h),
            Corner(0.0, h),
        )
    )


def _i(d: Dims) -> Outline:
    h, b, t, w, r = d["d"], d["b_f"] / 2, d["t_f"], d["t_w"] / 2, d["r1"]
    return Outline(
        (
            Corner(-b, 0.0),
            Corner(b, 0.0),
            Corner(b, t),
            Corner(w, t, r),
            Corner(w, h - t, r),
            Corner(b, h - t),
            Corner(b, h),
            Corner(-b, h),
            Corner(-b, h - t),
            Corner(-w, h - t, r),
            Corner(-w, t, r),
            Corner(-b, t),
        )
    )


def _tee(d: Dims) -> Outline:
    h, b, t, w, r = d["d"], d["b_f"] / 2, d["t_f"], d["t_w"] / 2, d["r1"]
    return Outline(
        (
            Corner(-w, 0.0),
            Corner(w, 0.0),
            Corner(w, h - t, r),
            Corner(b, h - t),
            Corner(b, h),
            Corner(-b, h),
            Corner(-b, h - t),
            Corner(-w, h - t, r),
        )
    )


def _rectangle(b: float, h: float, r: float = 0.0) -> tuple[Corner, ...]:
    return tuple(
        Corner(sx * b / 2, sy * h / 2, r) for sx, sy in ((-1, -1), (1, -1), (1, 1), (-1, 1))
    )


def _rhs(d: Dims) -> Outline:
    t, inner = d["t"], max(d["r_ext"] - d["t"], 0.0)
    return Outline(
        _rectangle(d["b"], d["d"], d["r_ext"]),
        (_rectangle(d["b"] - 2 * t, d["d"] - 2 * t, inner),),
    )


_MAKERS = {
    "angle": _angle,
    "channel": _channel,
    "I": _i,
    "tee": _tee,
    "flat": lambda d: Outline(_rectangle(d["b"], d["t"])),
    "round": lambda d: Outline(Circle(0.0, 0.0, d["d"] / 2)),
    "CHS": lambda d: Outline(
        Circle(0.0, 0.0, d["d"] / 2), (Circle(0.0, 0.0, d["d"] / 2 - d["t"]),)
    ),
    "RHS": _rhs,
}
