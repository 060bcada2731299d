"""How far a formula reaches: an estimate that spares measuring the many short ones.

Measuring costs the typesetter more than setting. The widths below were measured in the
mathematical font the pages are set in; a fraction "a / b" counts both its parts, so that the
estimate of a line errs on the long side. A formula it takes for short by mistake is still broken
at the margin, only less well.
"""

from __future__ import annotations

import re

_TOKEN = re.compile(r'"[^"]*"|\\,|[A-Za-z][A-Za-z.]+|[A-Za-z]|\d[\d.]*|\S')
# Widths in ems of the text size, blanks around signs included.
_WIDTHS = {
    **dict.fromkeys("ijlt", 0.36),
    **dict.fromkeys("IJL", 0.65),
    **dict.fromkeys("MW", 1.08),
    **dict.fromkeys("=<>", 1.33),
    **dict.fromkeys(("lt.eq", "gt.eq"), 1.33),
    **dict.fromkeys("+-", 1.22),
    **dict.fromkeys(("upright", "frac"), 0.0),
    "m": 0.88,
    "w": 0.72,
    "med": 0.22,
    "quad": 1.0,
    "dot.op": 0.72,
    "sqrt": 0.83,
    "sin": 1.23,
    "cos": 1.34,
    "tan": 1.45,
    "min": 1.75,
    "max": 1.9,
    "/": 0.2,
    "\\,": 0.44,
    "'": 0.3,
}
_SMALL_LETTER, _CAPITAL, _DIGIT, _BRACKET, _OTHER = 0.55, 0.82, 0.5, 0.39, 0.65
# Upright words, letter by letter.
_UPRIGHT = {"m": 0.83, "M": 0.92, " ": 0.33}
_CALLS = ("upright", "frac", "sqrt")
_SCRIPT = 0.72  # size of a subscript or superscript


def reach(markup: str) -> float:
    """The width in ems at which a formula of the typesetter's markup will be set, about."""
    total, size = 0.0, 1.0
    outside: list[tuple[float, float, float]] = []
    script = call = False
    # Width so far of the group that is open, and of the numerator it may have had.
    numerator = 0.0
    for token in _TOKEN.findall(markup):
        if token in "_^":
            script = True
        elif token == "(":
            outside.append((total, size, numerator))
            size *= _SCRIPT if script else 1.0
            # Brackets of scripts and calls only group; others are printed.
            total = 0.0 if script or call else 2 * _BRACKET * size
            script = call = False
            numerator = 0.0
        elif token == ")" and outside:
            group = max(total, numerator)
            total, size, numerator = outside.pop()
            total += group
        elif token == ",":
            numerator, total = total, 0.0
        else:
            total += _width(token) * size * (_SCRIPT if script else 1.0)
            script = False
            call = token in _CALLS
    return max(total, numerator)


def _width(token: str) -> float:
    if token in _WIDTHS:
        return _WIDTHS[token]
    if token[0] == '"':
        return sum(
            _UPRIGHT.get(letter, 0.75 if letter.isupper() else _DIGIT) for letter in token[1:-1]
        )
    if token[0].isdigit():
        return _DIGIT * len(token)
    if token[0].isalpha():
        return _CAPITAL if token[0].isupper() else _SMALL_LETTER
    return _OTHER
