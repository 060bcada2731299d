"""Words and tables of a result, read as text, HTML and markdown: shown, exported and printed."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass
from html import escape
from typing import Any

Row = Sequence[str]


@dataclass(frozen=True)
class Rows:
    """A table: its head, its rows, and which columns hold numbers, set to the right."""

    head: Row
    rows: Sequence[Row]
    numbers: Sequence[int] = ()
    caption: str = ""


@dataclass(frozen=True)
class Reading:
    """A title, paragraphs, and tables after them."""

    title: str
    says: Sequence[str] = ()
    tables: Sequence[Rows] = ()

    def text(self) -> str:
        """For a terminal."""
        parts = [self.title, *self.says]
        for grid in self.tables:
            parts.append("\n".join([*([grid.caption] if grid.caption else []), *_text_rows(grid)]))
        return "\n\n".join(part for part in parts if part)

    def markdown(self) -> str:
        """For the package, which prints it as prose and tables."""
        parts = [f"**{_plain(self.title)}**" if self.title else "", *map(_plain, self.says)]
        for grid in self.tables:
            if grid.caption:
                parts.append(f"*{_plain(grid.caption)}*")
            parts.append("\n".join(_markdown_rows(grid)))
        return "\n\n".join(part for part in parts if part)

    def html(self) -> str:
        """For a notebook: no script, offline."""
        parts = [f"<p><strong>{escape(self.title)}</strong></p>" if self.title else ""]
        parts += [f"<p>{escape(words)}</p>" for words in self.says]
        parts += ["".join(_html_rows(grid)) for grid in self.tables]
        return f'<div class="tl-reading">{"".join(parts)}</div>'

    def bundle(self) -> dict[str, Any]:
        """Every reading by its mimetype."""
        return {
            "text/plain": self.text(),
            "text/markdown": self.markdown(),
            "text/html": self.html(),
        }


def _text_rows(grid: Rows) -> list[str]:
    rows = [grid.head, *grid.rows]
    widths = [max(len(row[k]) for row in rows) for k in range(len(grid.head))]
    lines = [
        "  ".join(
            f"{cell:>{width}}" if k in grid.numbers else f"{cell:<{width}}"
            for k, (cell, width) in enumerate(zip(row, widths, strict=True))
        ).rstrip()
        for row in rows
    ]
    return [lines[0], "  ".join("─" * width for width in widths), *lines[1:]]


_MARKS = re.compile(r"([\\`*_{}\[\]<>#|$~^@!&])")


def _plain(words: str) -> str:
    """Words as markdown that means only themselves."""
    return _MARKS.sub(r"\\\1", " ".join(words.split()))


def _markdown_rows(grid: Rows) -> list[str]:
    def row(cells: Row) -> str:
        return "| " + " | ".join(_plain(cell) or " " for cell in cells) + " |"

    rule = ["---:" if k in grid.numbers else ":---" for k in range(len(grid.head))]
    return [row(grid.head), "|" + "|".join(rule) + "|", *map(row, grid.rows)]


def _html_rows(grid: Rows) -> list[str]:
    def row(cells: Row, tag: str) -> str:
        out = "".join(
            f'<{tag} style="text-align:{"right" if k in grid.numbers else "left"}">'
            f"{escape(cell)}</{tag}>"
            for k, cell in enumerate(cells)
        )
        return f"<tr>{out}</tr>"

    caption = f"<caption>{escape(grid.caption)}</caption>" if grid.caption else ""
    body = "".join(row(cells, "td") for cells in grid.rows)
    return [f"<table>{caption}<thead>{row(grid.head, 'th')}</thead><tbody>{body}</tbody></table>"]
