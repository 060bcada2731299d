"""A record as plain text for a terminal."""

from __future__ import annotations

from typing import Any

_WIDTH = 100


def of(record: dict[str, Any]) -> str:
    """The whole record: headline, inputs, lines with clauses, checks, and what is left out."""
    out = [record["headline"]]
    if record["standard"]["name"]:
        out.append(f"to {record['standard']['name']}")
    out += ["", "Inputs"]
    out += _columns(
        [[i["symbol"], i["text"], i["meaning"], i["origin"]] for i in record["inputs"]], indent=2
    )
    for part in record["parts"]:
        out += ["", part["title"]]
        for line in part["lines"]:
            out += _line(line)
    if record["checks"]:
        out += ["", "Checks", *checks(record)]
    for title, key in (("Assumed", "assumptions"), ("Not checked", "not_checked")):
        if record[key]:
            out += ["", title, *(f"  - {text}" for text in record[key])]
    return "\n".join(out) + "\n"


def checks(record: dict[str, Any], indent: int = 2) -> list[str]:
    """The table of checks."""
    rows = [["part", "check", "clause", "demand", "capacity", "utilisation", "verdict"]]
    rows += [
        [
            check["part"],
            check["name"],
            check["clause"],
            check["demand_text"],
            check["capacity_text"],
            check["utilisation_text"],
            check["verdict"],
        ]
        for check in record["checks"]
    ]
    return _columns(rows, indent)


def _line(line: dict[str, Any]) -> list[str]:
    clause = f"[{line['clause']}]" if line["clause"] else ""
    if line["kind"] in ("note", "not covered"):
        words = f"  {line['title']}" + (f": {line['note']}" if line["note"] else "")
        return [_right(words, clause)]
    out = [_right(f"  {line['title']}", clause), f"    {line['text']}"]
    if line["kind"] == "check":
        out[-1] += f"   utilisation {line['utilisation_text']}: {line['verdict']}"
    if line["note"]:
        out.append(f"      {line['note']}")
    return out


def _right(words: str, clause: str) -> str:
    return words if not clause else f"{words:<{_WIDTH - len(clause) - 1}} {clause}"


def _columns(rows: list[list[str]], indent: int) -> list[str]:
    if not rows:
        return []
    widths = [max(len(row[i]) for row in rows) for i in range(len(rows[0]))]
    return [
        (" " * indent + "  ".join(f"{c:<{w}}" for c, w in zip(row, widths, strict=True))).rstrip()
        for row in rows
    ]
