"""A scene as SVG: real text, inline attributes only, the same bytes for the same scene."""

from __future__ import annotations

from html import escape

from tensionlib.joints.scene import Chain, Circle, Curve, Line, Scene, Style, Text

FONT = "DejaVu Sans, Liberation Sans, Arial, sans-serif"
_INK, _SOFT, _ACCENT = "#1c2226", "#59636b", "#7b2d26"

# Stroke, width in mm, dashes, fill.
_STYLES: dict[Style, tuple[str, float, str, str]] = {
    "member": (_INK, 0.5, "", "#dde2e5"),
    "gusset": (_SOFT, 0.4, "", "#f2eee3"),
    "hidden": (_SOFT, 0.3, "1.8 1.1", "none"),
    "centre": (_SOFT, 0.22, "4 1 0.8 1", "none"),
    "bolt": (_INK, 0.35, "", "#ffffff"),
    "weld": (_INK, 0.9, "", "none"),
    "net": (_ACCENT, 0.8, "3.4 1.2 0.9 1.2", "none"),
    "shear": (_INK, 1.0, "", "none"),
    "tension": (_INK, 1.0, "2.6 1.2", "none"),
    "hatch": (_SOFT, 0.22, "", "none"),
    "force": (_ACCENT, 0.8, "", _ACCENT),
    "dimension": (_SOFT, 0.2, "", "none"),
    "break": (_SOFT, 0.3, "", "none"),
}


def to_svg(scene: Scene, width_mm: float = 160.0) -> str:
    """The scene as one SVG element, `width_mm` wide."""
    body = "".join(_item(item) for item in scene.items)
    height = width_mm * scene.height / scene.width
    return (
        f'<svg xmlns="http://www.w3.org/2000/svg" width="{_n(width_mm)}mm" height="{_n(height)}mm"'
        f' viewBox="0 0 {_n(scene.width)} {_n(scene.height)}" font-family="{FONT}">{body}</svg>'
    )


def _n(number: float) -> str:
    text = f"{number:.2f}".rstrip("0").rstrip(".")
    return "0" if text in ("-0", "") else text


def _style(style: Style, *, filled: bool = False) -> str:
    stroke, width, dashes, fill = _STYLES[style]
    dash = f' stroke-dasharray="{dashes}"' if dashes else ""
    inside = fill if filled else "none"
    return f'fill="{inside}" stroke="{stroke}" stroke-width="{_n(width)}"{dash}'


def _item(item: Line | Curve | Circle | Text | Chain) -> str:
    match item:
        case Line(points, style, closed):
            tag = "polygon" if closed else "polyline"
            shown = " ".join(f"{_n(x)},{_n(y)}" for x, y in points)
            return f'<{tag} points="{shown}" {_style(style, filled=closed)}/>'
        case Curve(steps, style):
            return f'<path d="{_path(steps)}" {_style(style, filled=True)}/>'
        case Circle(x, y, r, style):
            shown = _style(style, filled=True)
            return f'<circle cx="{_n(x)}" cy="{_n(y)}" r="{_n(r)}" {shown}/>'
        case Text():
            return _text(item)
        case Chain():
            return _chain(item)


def _path(steps: tuple[tuple[float, ...], ...]) -> str:
    out = [f"M{_n(steps[0][0])} {_n(steps[0][1])}"]
    for step in steps[1:]:
        if len(step) == 2:
            out.append(f"L{_n(step[0])} {_n(step[1])}")
        else:
            x, y, r, left = step
            out.append(f"A{_n(r)} {_n(r)} 0 0 {0 if left else 1} {_n(x)} {_n(y)}")
    return "".join(out) + "Z"


def _text(text: Text) -> str:
    bold = ' font-weight="bold"' if text.bold else ""
    anchor = "" if text.anchor == "start" else f' text-anchor="{text.anchor}"'
    return (
        f'<text x="{_n(text.x)}" y="{_n(text.y)}" font-size="{_n(text.height)}"'
        f' fill="{_INK}"{anchor}{bold}>{escape(text.text)}</text>'
    )


def _chain(chain: Chain) -> str:
    """Extension lines, the line itself, a slanted tick at each stop, leaders and labels."""

    def place(along: float, across: float) -> tuple[float, float]:
        return (along, across) if chain.axis == "x" else (across, along)

    out = []
    beyond = 1.2 if chain.at > chain.reach else -1.2
    for stop in chain.stops:
        start = chain.reach + (0.8 if beyond > 0 else -0.8)
        out.append(Line((place(stop, start), place(stop, chain.at + beyond)), "dimension"))
        x, y = place(stop, chain.at)
        out.append(Line(((x - 0.9, y + 0.9), (x + 0.9, y - 0.9)), "bolt"))
    ends = place(chain.stops[0], chain.at), place(chain.stops[-1], chain.at)
    out.append(Line(ends, "dimension"))
    out += [Line(leader, "dimension") for leader in chain.leaders]
    return "".join(map(_item, out)) + "".join(map(_text, chain.texts))
