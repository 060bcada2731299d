"""Numbers and quantities as they are printed: significant figures, never an exponent."""

from __future__ import annotations

from numbers import Integral

from tensionlib.quantities.roles import Role
from tensionlib.quantities.views import METRIC, DisplayUnit, View

LINE_FIGURES = 5
SUMMARY_FIGURES = 4

# A number inside is good to 12 figures, so one that lies this near below a half is that half, and
# halves go away from zero as they do on paper. (2675.45 is held as 2675.44999999999982.)
_HALF = 1 + 1e-13


def format_number(x: float, figures: int = LINE_FIGURES) -> str:
    """Write a number to so many significant figures: no trailing zeros, no exponent, no "-0".

    An int stays whole whatever its length; NaN reads "not a number", infinity "∞".
    """
    if x.__class__ is not float and isinstance(x, Integral):
        return str(int(x))
    text = f"{x * _HALF if figures <= 12 else x:.{figures}g}"
    if "e" not in text and "n" not in text:
        return text if text != "-0" else "0"
    return _without_exponent(text)


def _without_exponent(text: str) -> str:
    """Spell out what Python writes with an exponent, and what is no number."""
    if "nan" in text:
        return "not a number"
    if "inf" in text:
        return "-∞" if text[0] == "-" else "∞"
    mantissa, _, exponent = text.partition("e")
    sign = "-" if mantissa[0] == "-" else ""
    whole, _, decimals = mantissa.lstrip("-").partition(".")
    digits = whole + decimals
    power = int(exponent)
    if power < 0:
        return f"{sign}0.{'0' * (-power - 1)}{digits}"
    return sign + digits.ljust(power + 1, "0")


def text_in(internal: float, unit: DisplayUnit, role: Role, figures: int) -> str:
    """Write an internal number in a given unit."""
    if role.whole and internal == internal // 1:
        return str(int(internal))
    number = format_number(internal / unit.size, figures)
    return number + unit.text_suffix if internal == internal else number


def latex_in(internal: float, unit: DisplayUnit, role: Role, figures: int) -> str:
    """Write an internal number in a given unit as LaTeX."""
    if role.whole and internal == internal // 1:
        number = str(int(internal))
    else:
        number = format_number(internal / unit.size, figures)
        if internal != internal:
            return rf"\text{{{number}}}"
        if "∞" in number:
            number = number.replace("∞", r"\infty")
    if number[0] == "-":
        return rf"\left({number}{unit.latex_suffix}\right)"
    return number + unit.latex_suffix


def format_value(
    internal: float, role: Role, view: View = METRIC, figures: int = LINE_FIGURES
) -> str:
    """Write an internal number (N, mm, MPa, rad, kg) with the unit its role has in the view."""
    return text_in(internal, view.unit(role), role, figures)


def latex_value(
    internal: float, role: Role, view: View = METRIC, figures: int = LINE_FIGURES
) -> str:
    r"""Write an internal number as LaTeX, ``285\ \text{kN}``; a negative one stands in brackets."""
    return latex_in(internal, view.unit(role), role, figures)


def format_utilisation(u: float) -> str:
    """Write a utilisation to three decimals so that it never says other than the verdict.

    Above 1 it never reads "1.000" (1.00001 is "1.001"), and above 0 it never reads "0.000".
    At or below 1 it is rounded to the nearest, so 0.99996 is "1.000", which passes too.
    """
    if not -1e4 < u < 1e4:
        return format_number(u, LINE_FIGURES)
    text = f"{u * _HALF:.3f}"
    if text == "1.000" and u > 1:
        return "1.001"
    if text in ("0.000", "-0.000"):
        return "0.001" if u > 0 else "0.000" if u == 0 else "-0.001"
    return text
