"""A record as LaTeX: one aligned row a line."""

from __future__ import annotations

from typing import Any


def row(line: dict[str, Any], *, align: str = "&") -> str:
    """One line of a record: "A_g = b t = 100 mm · 8 mm = 800 mm²", or a tested condition.

    Empty for a line of words.
    """
    steps = list(line["steps"])
    if not steps:
        return ""
    if line["latex"]:
        return f" {align}= ".join([line["latex"], " = ".join(steps)])
    return rf"{align}" + r",\quad ".join(steps)


def of(record: dict[str, Any]) -> str:
    """Every line of the record in one `aligned` block a part."""
    blocks = []
    for part in record["parts"]:
        rows = [
            row(line) + rf" &&\text{{{_escaped(line['clause'])}}}"
            for line in part["lines"]
            if line["steps"]
        ]
        if rows:
            blocks.append(
                r"\begin{aligned}" + "\n" + (r" \\" + "\n").join(rows) + "\n" + r"\end{aligned}"
            )
    return "\n\n".join(f"$$\n{block}\n$$" for block in blocks)


_ESCAPES = str.maketrans(
    {
        "\\": r"\textbackslash{}",
        "{": r"\{",
        "}": r"\}",
        "$": r"\$",
        "&": r"\&",
        "#": r"\#",
        "_": r"\_",
        "%": r"\%",
        "^": r"\textasciicircum{}",
        "~": r"\textasciitilde{}",
    }
)


def _escaped(text: str) -> str:
    return text.translate(_ESCAPES)
