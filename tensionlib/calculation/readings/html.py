"""A record as HTML for a notebook: folds on screen, open in print, whole without style or script.

Mathematics is MathML, which every browser of today sets by itself: an exported page needs neither
script nor network. A plain-text copy stands inside, hidden by the style sheet alone, so that a page
stripped of styles still shows every number.
"""

from __future__ import annotations

from functools import cache
from html import escape
from importlib.resources import files
from typing import Any

from tensionlib.calculation.readings import mathml, text

Record = dict[str, Any]


@cache
def style() -> str:
    """The style sheet, one for all readings."""
    return (files(__package__) / "calculation.css").read_text(encoding="utf-8")


def of(record: Record) -> str:
    """The whole calculation."""
    body = [
        _headline(record),
        _sketches(record),
        _fold("Inputs", _inputs(record), open_=False),
        *(_fold(part["title"], _lines(part), open_=False) for part in record["parts"]),
        _fold("Checks", _checks(record), open_=True) if record["checks"] else "",
        _bullets("Assumed", record["assumptions"]),
        _bullets("Not checked", record["not_checked"]),
        _provenance(record),
        f'<pre class="tl-text">{escape(text.of(record))}</pre>',
    ]
    return f'<style>{style()}</style><div class="tl-calc">{"".join(body)}</div>'


def _words(words: str, kind: str = "tl-words") -> str:
    """User text: never typeset as mathematics."""
    return f'<span class="{kind} tex2jax_ignore mathjax_ignore">{escape(words)}</span>'


def _headline(record: Record) -> str:
    word, mark, title = record["verdict"]["word"], record["mark"], record["title"]
    kind = {"": "", "PASS": "tl-pass", "FAIL": "tl-fail"}.get(word, "tl-open")
    says = record["headline"].removeprefix(mark).removeprefix(": ")
    standard = record["standard"]["name"]
    return (
        f'<p class="tl-headline {kind}"><strong>{_words(f"{mark}, {title}" if title else mark)}'
        f"</strong><br>{_words(says)}</p>"
        + (f'<p class="tl-standard">{_words(standard)}</p>' if standard else "")
    )


def _sketches(record: Record) -> str:
    return "".join(
        f'<figure role="img" aria-label="{escape(sketch["alt"])}">{sketch["svg"]}'
        f"<figcaption>{_words(sketch['title'])}</figcaption></figure>"
        for sketch in record["sketches"]
    )


def _fold(title: str, content: str, *, open_: bool) -> str:
    return (
        f"<details{' open' if open_ else ''}><summary>{_words(title)}</summary>{content}</details>"
    )


def _table(kind: str, head: list[str], rows: list[list[str]], numbers: range) -> str:
    """A table; the columns of `numbers` stand to the right."""
    right = [' class="tl-number"' if i in numbers else "" for i in range(len(head))]

    def row(tag: str, cells: list[str]) -> str:
        inside = zip(right, cells, strict=True)
        return "<tr>" + "".join(f"<{tag}{to}>{cell}</{tag}>" for to, cell in inside) + "</tr>"

    body = "".join(row("td", cells) for cells in rows)
    table = f'<table class="{kind}"><thead>{row("th", head)}</thead><tbody>{body}</tbody></table>'
    return f'<div class="tl-wide">{table}</div>'


def _inputs(record: Record) -> str:
    rows = [
        [
            mathml.of(f"{entry['latex']} = {entry['latex_value']}"),
            _words(entry["meaning"]),
            _words(entry["part"]),
            _words(entry["origin"]),
        ]
        for entry in record["inputs"]
    ]
    return _table("tl-inputs", ["Input", "Meaning", "Part", "From"], rows, range(0))


def _lines(part: Record) -> str:
    return '<div class="tl-lines">' + "".join(map(_line, part["lines"])) + "</div>"


def _line(line: Record) -> str:
    clause = _words(line["clause"], "tl-clause")
    if line["kind"] == "note":
        return f'<div class="tl-line">{_words(line["title"], "tl-alone")}{clause}</div>'
    if line["kind"] == "not covered":
        words = f"<strong>Not covered: {_words(line['title'])}.</strong> {_words(line['note'])}"
        return f'<div class="tl-line"><span class="tl-alone">{words}</span>{clause}</div>'
    work, kind = _steps(line), "tl-line"
    if line["kind"] == "check":
        kind = "tl-line tl-check"
        verdict = f"utilisation {line['utilisation_text']}: {line['verdict']}"
        work += " " + _words(verdict, "tl-verdict")
    note = _words(line["note"], "tl-note") if line["note"] else ""
    return (
        f'<div class="{kind}">{_words(line["title"], "tl-what")}<div class="tl-work">'
        f'<div class="tl-steps">{work}</div>{note}</div>{clause}</div>'
    )


def _steps(line: Record) -> str:
    first, *others = line["steps"]
    if not line["latex"]:
        return "; ".join(map(mathml.of, line["steps"]))
    steps = [f"{line['latex']} = {first}", *(f"= {step}" for step in others)]
    return "<wbr>".join(mathml.of(term) for step in steps for term in _terms(step))


def _terms(latex: str) -> list[str]:
    """A step cut before each outer + and -, where a long one may go on to the next line."""
    if " + " not in latex and " - " not in latex:
        return [latex]
    terms, start, depth = [], 0, 0
    for at, sign in enumerate(latex):
        if sign in "({":
            depth += 1
        elif sign in ")}":
            depth -= 1
        elif depth == 0 and latex[at : at + 3] in (" + ", " - "):
            terms.append(latex[start:at])
            start = at + 1
    return [*terms, latex[start:]]


def table_of_checks(record: Record) -> str:
    """The checks alone, with the style they are shown in."""
    return f"<style>{style()}</style>" + f'<div class="tl-calc">{_checks(record)}</div>'


def _checks(record: Record) -> str:
    rows = [
        [
            _words(check["part"]),
            _words(check["name"]) + (_words(check["note"], "tl-note") if check["note"] else ""),
            _words(check["clause"]),
            _words(check["demand_text"]),
            _words(check["capacity_text"]),
            _words(check["utilisation_text"]),
            f"<strong>{_words(check['verdict'])}</strong>"
            if check["verdict"] in ("fail", "not covered")
            else _words(check["verdict"]),
        ]
        for check in record["checks"]
    ]
    head = ["Part", "Check", "Clause", "Demand", "Capacity", "Utilisation", "Verdict"]
    return _table("tl-checks", head, rows, range(3, 6))


def _bullets(title: str, texts: list[str]) -> str:
    if not texts:
        return ""
    items = "".join(f"<li>{_words(words)}</li>" for words in texts)
    return _fold(title, f"<ul>{items}</ul>", open_=False)


def _provenance(record: Record) -> str:
    made = record["provenance"]
    return (
        '<p class="tl-made">'
        + _words(f"tensionlib {made['version']}, inputs {made['inputs_hash'][:19]}")
        + "</p>"
    )
