"""A record as HTML for a notebook: folds on screen, open in print, whole without style or script.

Mathematics is LaTeX between dollar signs, which JupyterLab and exported pages typeset with their
own bundled MathJax. A plain-text copy stands inside, hidden by the style sheet alone, so that a
page stripped of styles still shows every number.
"""

from __future__ import annotations

from functools import cache
from html import escape
from importlib.resources import files
from typing import Any

from tensionlib.calculation.readings import text

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


def maths(latex: str) -> str:
    """LaTeX set inline; the HTML's own special characters escaped."""
    return f'<span class="tl-maths">${escape(latex, quote=False)}$</span>'


def _words(words: str, kind: str = "tl-words") -> str:
    """User text: never typeset as mathematics."""
    return f'<span class="{kind} tex2jax_ignore mathjax_ignore">{escape(words)}</span>'


def _headline(record: Record) -> str:
    word = record["verdict"]["word"]
    kind = {"PASS": "tl-pass", "FAIL": "tl-fail"}.get(word, "tl-open")
    title = f" – {record['title']}" if record["title"] else ""
    return (
        f'<p class="tl-headline {kind if word else ""}"><strong>{_words(record["mark"] + title)}'
        f"</strong><br>{_words(record['headline'])}</p>"
        + (
            f'<p class="tl-standard">{_words(record["standard"]["name"])}</p>'
            if record["standard"]["name"]
            else ""
        )
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


def _table(head: list[str], rows: list[list[str]], kind: str) -> str:
    heads = "".join(f"<th>{escape(cell)}</th>" for cell in head)
    body = "".join("<tr>" + "".join(f"<td>{c}</td>" for c in row) + "</tr>" for row in rows)
    return f'<table class="{kind}"><thead><tr>{heads}</tr></thead><tbody>{body}</tbody></table>'


def _inputs(record: Record) -> str:
    rows = [
        [
            maths(f"{entry['latex']} = {entry['latex_value']}"),
            _words(entry["meaning"]),
            _words(entry["origin"]),
        ]
        for entry in record["inputs"]
    ]
    return _table(["Input", "Meaning", "From"], rows, "tl-inputs")


def _lines(part: Record) -> str:
    return '<div class="tl-lines">' + "".join(map(_line, part["lines"])) + "</div>"


def _line(line: Record) -> str:
    clause = _words(line["clause"], "tl-clause")
    if line["kind"] == "note":
        content = _words(line["title"])
    elif line["kind"] == "not covered":
        content = f"<strong>Not covered: {_words(line['title'])}.</strong> {_words(line['note'])}"
    else:
        content = _words(line["title"], "tl-what") + _steps(line)
        if line["kind"] == "check":
            content += _words(
                f" utilisation {line['utilisation_text']}: {line['verdict']}", "tl-verdict"
            )
        if line["note"]:
            content += _words(line["note"], "tl-note")
    return f'<div class="tl-line"><div>{content}</div>{clause}</div>'


def _steps(line: Record) -> str:
    steps = line["steps"]
    if not line["latex"]:
        return '<div class="tl-steps">' + "<span>; </span>".join(map(maths, steps)) + "</div>"
    first, *others = steps
    spans = [maths(f"{line['latex']} = {first}"), *(maths(f"= {step}") for step in others)]
    return '<div class="tl-steps">' + " ".join(spans) + "</div>"


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
    return _table(head, rows, "tl-checks")


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
