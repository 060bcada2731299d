"""The document as a PDF: one run of pandoc for its words and formulas, then the typesetter.

The templates get all data as one JSON file and show it as text; nothing a user wrote is read as
markup, but for prose and formulas, which pandoc has turned into markup before.
"""

from __future__ import annotations

import datetime
import json
import re
import tempfile
from collections import Counter
from collections.abc import Iterator, Mapping, Sequence
from importlib.metadata import PackageNotFoundError, version
from pathlib import Path
from typing import Any

from tensionlib.errors import InputError, TensionlibError
from tensionlib.package.document import (
    Calculated,
    Code,
    Document,
    Equations,
    Picture,
    Printed,
    Prose,
    Record,
    Scheduled,
    identity,
    picture,
)
from tensionlib.package.markup import TEMPLATES, Converted, Formulas, convert
from tensionlib.package.reach import reach

PAPERS = {"A4": "a4", "Letter": "us-letter"}
# A PDF for keeping must say when it was made. Without a date of the project's own it says this
# one, so that equal inputs give equal bytes.
UNDATED = datetime.date(1980, 1, 1)
DEEPEST_HEADING = 3
PROJECT_WORDS = (
    "job_number",
    "title",
    "client",
    "site",
    "made_by",
    "checked_by",
    "approved_by",
    "status",
    "revision",
    "date",
    "standard",
)


def typeset(document: Document, paper: str | None = None) -> bytes:
    """The document as PDF/A-3b.

    Parameters
    ----------
    document : Document
    paper : str, optional
        "A4" or "Letter"; the project's own, else A4, unless given.

    Raises
    ------
    InputError
        For another paper, a date that is not written as 2026-03-05, mathematics that cannot be
        set, or a character that no font has; each names where it stands.
    TensionlibError
        When the typesetter or pandoc is missing or fails.
    """
    pieces = _Pieces()
    data = _data(document, paper, pieces)
    try:
        return _compile("package.typ", data, pieces.files)
    except _Refused as refused:
        raise _explained(refused, document, pieces) from refused


# Data for the templates -------------------------------------------------------------------------


class _Pieces:
    """What the templates draw on beside plain data: files, and markup with its place."""

    def __init__(self) -> None:
        self.files: dict[str, bytes] = {}
        self.formulas = Formulas()
        self.markup: list[tuple[str, str, str]] = []

    def picture(self, kind: str, data: bytes, place: str) -> str:
        """The name under which the templates find a picture; `place` is for messages."""
        name = f"picture-{len(self.files)}.{kind}"
        self.files[name] = data
        self.markup.append((place, "picture", name))
        return name


def _data(document: Document, paper: str | None, pieces: _Pieces) -> dict[str, Any]:
    formulas = pieces.formulas
    project = _project(document.project)
    calculated = {identity(one.record): one for one in document.calculations}
    places = {key: place for place, key in enumerate(calculated)}
    calculations = [_calculation(one, pieces) for one in calculated.values()]
    notation = _notation(list(calculated.values()), formulas)
    rows = {
        id(block): [formulas.index(row, block.cell) for row in block.rows]
        for block in document.blocks
        if isinstance(block, Equations)
    }
    prose = [block for block in document.blocks if isinstance(block, Prose)]
    converted, maths = convert([(block.cell, block.markdown) for block in prose], formulas)
    for index, text in enumerate(maths):
        pieces.markup.append((f"cell {formulas.cell(index)}", "formula", text))
    for block, one in zip(prose, converted, strict=True):
        pieces.markup.append((f"cell {block.cell}", "prose", one.markup))
    by_block = {id(block): one for block, one in zip(prose, converted, strict=True)}
    blocks = _blocks(document, by_block, rows, places, pieces)
    standards = [
        _line((one.record.get("standard") or {}).get("name")) for one in calculated.values()
    ]
    project["standard"] = project["standard"] or "; ".join(dict.fromkeys(filter(None, standards)))
    title = project["title"] or _first_heading(converted) or document.name
    draft = project["status"].lower() != "issued"
    attachments = []
    for number, attachment in enumerate(document.attachments):
        pieces.files[f"attached-{number}"] = attachment.data
        attachments.append(
            {
                "file": f"attached-{number}",
                "name": attachment.name,
                "mimetype": attachment.mimetype,
                "relationship": attachment.relationship,
                "description": attachment.description,
                "fingerprint": attachment.fingerprint,
            }
        )
    sources = _sources(calculated.values())
    return {
        "paper": _paper(paper or str(document.project.get("paper") or "A4")),
        "date": _date(project["date"]),
        "project": {**project, "title": title, "status": "draft" if draft else "issued"},
        "draft": draft,
        "heading": " \N{EN DASH} ".join(filter(None, (project["job_number"], title))),
        "authors": [project["made_by"]] if project["made_by"] else [],
        "head": {
            "job": _short(project["job_number"], 24),
            "title": _short(title, 70),
            "revision": _short(project["revision"], 16),
            "foot": _short(", ".join(filter(None, (project["client"], project["site"]))), 90),
        },
        "math": maths,
        "reach": [round(reach(text), 2) for text in maths],
        "blocks": blocks,
        "calculations": calculations,
        "doubled": _doubled(list(calculated.values())),
        "basis": {
            "sources": sources,
            "materials": _materials(list(calculated.values())),
            "assumptions": _assumptions(list(calculated.values())),
        },
        "notation": notation,
        "attachments": attachments,
        "versions": _versions(calculated.values()),
        "from_memory": [row["name"] for row in sources if "memory" in row["known"].lower()],
    }


def _paper(paper: str) -> str:
    for name, code in PAPERS.items():
        if paper.lower() == name.lower():
            return code
    raise InputError(f"paper: got {paper!r}; give 'A4' or 'Letter'")


def _date(text: str) -> list[int]:
    if not text:
        date = UNDATED
    else:
        try:
            date = datetime.date.fromisoformat(text)
        except ValueError:
            raise InputError(
                f"project date: got {text!r}; write year-month-day, for example '2026-03-05'"
            ) from None
    return [date.year, date.month, date.day]


def _line(value: Any) -> str:
    """One line of text, whatever the value."""
    return "" if value is None else " ".join(str(value).split())


def _short(text: str, most: int) -> str:
    return text if len(text) <= most else text[: most - 1].rstrip() + "\N{HORIZONTAL ELLIPSIS}"


def _project(record: Record) -> dict[str, Any]:
    project: dict[str, Any] = {key: _line(record.get(key)) for key in PROJECT_WORDS}
    standard = record.get("standard")
    if isinstance(standard, Mapping):
        project["standard"] = _line(standard.get("name"))
    project["notes"] = [_line(note) for note in record.get("notes") or []]
    keys = ("revision", "date", "description", "made_by", "checked_by")
    revisions = [
        {key: _line(row.get(key)) for key in keys} for row in record.get("revisions") or []
    ]
    present = {key: project.get(key, "") for key in keys}
    if not revisions and (present["revision"] or present["date"]):
        revisions = [{**present, "description": "this revision"}]
    project["revisions"] = revisions
    return project


def _calculation(calculated: Calculated, pieces: _Pieces) -> dict[str, Any]:
    record, cell = calculated.record, calculated.cell

    def formula(tex: Any) -> int | None:
        return pieces.formulas.index(str(tex), cell) if str(tex or "").strip() else None

    times = Counter(str(row.get("latex")) for row in record["inputs"])
    inputs = [
        {
            "meaning": _line(row.get("meaning"))
            # A symbol of two ends stands twice, and only its part tells which is which.
            + (f" ({_line(row.get('part'))})" if times[str(row.get("latex"))] > 1 else ""),
            "symbol": formula(row.get("latex")),
            "text": _line(row.get("text")),
            "origin": _line(row.get("origin")),
        }
        for row in record["inputs"]
    ]
    parts = [
        {"title": _line(part["title"]), "lines": [_step(line, formula) for line in part["lines"]]}
        for part in record["parts"]
    ]
    governing = record["verdict"].get("governing") or {}
    sketches = []
    for sketch in record.get("sketches") or []:
        svg = str(sketch["svg"])
        sketches.append(
            {
                "file": pieces.picture(
                    "svg", svg.encode(), f"cell {cell}, {record['mark']}, sketch"
                ),
                "title": _line(sketch.get("title")),
                "alt": _line(sketch.get("alt")) or "sketch",
                "shape": _shape(svg),
            }
        )
    return {
        "mark": _line(record["mark"]),
        "title": _line(record.get("title")),
        "headline": _line(record["headline"]),
        "word": _line(record["verdict"]["word"]),
        "section": _line(record.get("subject")).partition(", ")[0],
        "force": _force(record),
        "governing": {
            "name": _line(governing.get("label") or governing.get("name")),
            "clause": _line(governing.get("clause")),
            "utilisation": _number(governing.get("utilisation")),
            "utilisation_text": _line(governing.get("text")),
        },
        "sketches": sketches,
        "inputs": inputs,
        "parts": [part for part in parts if part["lines"]],
        "checks": [_check(row) for row in record["checks"]],
        "assumptions": [_line(words) for words in record.get("assumptions") or []],
        "not_checked": [_line(words) for words in record.get("not_checked") or []],
        "inputs_hash": identity(record)[1],
    }


def _step(line: Mapping[str, Any], formula: Any) -> dict[str, Any]:
    rights = [formula(step) for step in line.get("steps") or []]
    note = _line(line.get("note"))
    if line.get("verdict") and line.get("utilisation_text"):
        used = f"utilisation {line['utilisation_text']}: {line['verdict']}"
        note = f"{used}; {note}" if note else used
    return {
        "kind": str(line["kind"]),
        "title": _line(line.get("title")),
        "left": formula(line.get("latex")),
        "rights": [right for right in rights if right is not None],
        "text": _line(line.get("text")),
        "clause": _line(line.get("clause")),
        "note": note,
    }


def _check(row: Mapping[str, Any]) -> dict[str, Any]:
    return {
        "part": _line(row.get("part")),
        "name": _line(row["name"]),
        "clause": _line(row.get("clause")),
        "demand": _line(row.get("demand_text")),
        "capacity": _line(row.get("capacity_text")),
        "utilisation": _number(row.get("utilisation")),
        "utilisation_text": _line(row.get("utilisation_text")),
        "verdict": _line(row["verdict"]),
        "note": _line(row.get("note")),
    }


def _number(value: Any) -> float | None:
    """A number for a bar; None where the text alone must speak (no value, infinite)."""
    return float(value) if isinstance(value, int | float) and abs(value) < 1e9 else None


def _force(record: Record) -> str:
    """The design force: the headline names it between the section and the verdict."""
    if record.get("force"):
        return _line(record["force"])
    found = re.search(r", [^,:=]*= ([^,:]*)", str(record["headline"]))
    return _line(found[1]) if found else ""


_NUMBER = r"(\d+(?:\.\d+)?)"
_VIEW_BOX = re.compile(
    rf"""viewBox\s*=\s*["']\s*\S+[\s,]+\S+[\s,]+{_NUMBER}[\s,]+{_NUMBER}\s*["']"""
)


def _shape(svg: str) -> float:
    """Height over width of a sketch, as its view box states it; 0.5 where it states none."""
    box = _VIEW_BOX.search(svg)
    width, height = (float(box[1]), float(box[2])) if box else (0.0, 0.0)
    return height / width if width > 0.0 and height > 0.0 else 0.5


def _notation(calculated: Sequence[Calculated], formulas: Formulas) -> list[dict[str, Any]]:
    rows: dict[tuple[str, str, str], dict[str, Any]] = {}
    for one in calculated:
        for row in one.record.get("notation") or []:
            key = (str(row["latex"]), _line(row.get("meaning")), _line(row.get("unit")))
            if key not in rows:
                rows[key] = {
                    "symbol": formulas.index(key[0], one.cell),
                    "meaning": key[1],
                    "unit": key[2],
                    "order": _line(row.get("symbol")) or key[0],
                }
    return sorted(rows.values(), key=lambda row: (row["order"].casefold(), row["order"]))


def _sources(calculated: Any) -> list[dict[str, str]]:
    rows: dict[tuple[str, str], list[str]] = {}
    for one in calculated:
        for row in one.record.get("sources") or []:
            key = (_line(row.get("name")), _line(row.get("known")))
            uses = rows.setdefault(key, [])
            if (use := _line(row.get("use"))) and use not in uses:
                uses.append(use)
    return [
        {"name": name, "use": "; ".join(uses), "known": known}
        for (name, known), uses in rows.items()
    ]


def _materials(calculated: Sequence[Calculated]) -> list[dict[str, str]]:
    """Section and grade of each member, equal ones together."""
    marks: dict[str, list[str]] = {}
    for one in calculated:
        if subject := _line(one.record.get("subject")):
            marks.setdefault(subject, []).append(_line(one.record["mark"]))
    return [
        {"text": subject, "marks": ", ".join(dict.fromkeys(those))}
        for subject, those in marks.items()
    ]


def _assumptions(calculated: Sequence[Calculated]) -> list[str]:
    """Each assumption once, with the marks it is made for unless all share it."""
    marks: dict[str, list[str]] = {}
    for one in calculated:
        for words in one.record.get("assumptions") or []:
            marks.setdefault(_line(words), []).append(_line(one.record["mark"]))
    return [
        words if len(those) == len(calculated) else f"{words} ({', '.join(those)})"
        for words, those in marks.items()
    ]


def _doubled(calculated: Sequence[Calculated]) -> list[str]:
    counts = Counter(_line(one.record["mark"]) for one in calculated)
    return [mark for mark, count in counts.items() if count > 1]


def _versions(calculated: Any) -> list[dict[str, str]]:
    rows: dict[tuple[str, str], None] = {}
    for one in calculated:
        provenance = one.record.get("provenance") or {}
        if made := _line(provenance.get("version")):
            rows["tensionlib (calculations)", made] = None
        for name, number in sorted((provenance.get("packages") or {}).items()):
            rows[str(name), str(number)] = None
    for package in ("nbconvert", "pypandoc_binary", "typst"):
        try:
            rows[f"{package} (typesetting)", version(package)] = None
        except PackageNotFoundError:
            continue
    return [{"name": name, "version": number} for name, number in rows]


def _blocks(
    document: Document,
    converted: Mapping[int, Converted],
    rows: Mapping[int, list[int]],
    places: Mapping[tuple[str, str], int],
    pieces: _Pieces,
) -> list[dict[str, Any]]:
    printed: list[dict[str, Any]] = []
    shown: set[int] = set()
    level = 0

    def calculation(record: Record, under: int) -> None:
        place = places[identity(record)]
        if place in shown:
            printed.append({"kind": "seen", "index": place})
        else:
            shown.add(place)
            depth = min(under + 1, DEEPEST_HEADING)
            printed.append({"kind": "calculation", "index": place, "level": depth})

    for block in document.blocks:
        if isinstance(block, Prose):
            one = converted[id(block)]
            printed.append(_prose(document, block, one, pieces))
            level = one.headings[-1].level if one.headings else level
        elif isinstance(block, Code):
            printed.append({"kind": "code", "text": block.source})
        elif isinstance(block, Printed):
            printed.append({"kind": "printed", "text": block.text})
        elif isinstance(block, Equations):
            printed.append({"kind": "equations", "rows": rows[id(block)]})
        elif isinstance(block, Picture):
            printed.append({"kind": "picture", "file": _file(block, pieces), "alt": block.alt})
        elif isinstance(block, Calculated):
            calculation(block.record, level)
        elif isinstance(block, Scheduled):
            under = min(level + 1, DEEPEST_HEADING - 1)
            printed.append(
                {
                    "kind": "summary",
                    "title": _line(block.record.get("title")) or "Schedule of members",
                    "level": under,
                    "members": [places[identity(one.record)] for one in block.members],
                }
            )
            for member in block.members:
                calculation(member.record, under)
    return printed


def _prose(
    document: Document, block: Prose, converted: Converted, pieces: _Pieces
) -> dict[str, Any]:
    pictures = []
    for image in converted.images:
        found = picture(document, block, image.source)
        if found is None:
            words = f"![{image.alt}]({_short(image.source, 80)})"
            pictures.append({"file": None, "alt": words})
        else:
            pictures.append({"file": _file(found, pieces), "alt": image.alt or "picture"})
    return {"kind": "prose", "markup": converted.markup, "pictures": pictures}


def _file(one: Picture, pieces: _Pieces) -> str:
    return pieces.picture(one.kind, one.data, f"cell {one.cell}, picture")


def _first_heading(converted: Sequence[Converted]) -> str:
    return next((_line(one.headings[0].text) for one in converted if one.headings), "")


# The typesetter ---------------------------------------------------------------------------------


class _Refused(Exception):
    """What the typesetter said when it refused a page."""

    def __init__(self, message: str, diagnostic: str) -> None:
        super().__init__(message)
        self.diagnostic = diagnostic


def _compile(main: str, data: Mapping[str, Any], files: Mapping[str, bytes]) -> bytes:
    try:
        import typst
    except ImportError as missing:
        raise TensionlibError(
            'setting a package needs typst: pip install "tensionlib[package]"'
        ) from missing
    year, month, day = data["date"]
    # The typesetter sees this folder and nothing else of the machine.
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        for template in TEMPLATES.glob("*.typ"):
            (folder / template.name).write_bytes(template.read_bytes())
        for file, content in files.items():
            (folder / file).write_bytes(content)
        (folder / "data.json").write_text(json.dumps(data, sort_keys=True))
        try:
            return bytes(
                typst.compile(
                    folder / main,
                    root=folder,
                    pdf_standards=["a-3b"],
                    ignore_system_fonts=True,
                    timestamp=datetime.datetime(year, month, day, tzinfo=datetime.UTC),
                )
            )
        except typst.TypstError as error:
            raise _Refused(error.message, error.diagnostic) from error


# Saying where it failed -------------------------------------------------------------------------

_MISSING = re.compile(r'the text `"(.*?)"` could not be displayed')
_ESCAPED = re.compile(r"\\(?:u\{([0-9a-f]+)\}|(.))")


def _explained(refused: _Refused, document: Document, pieces: _Pieces) -> TensionlibError:
    if missing := _MISSING.search(str(refused)):
        text = _ESCAPED.sub(
            lambda found: chr(int(found[1], 16)) if found[1] else found[2], missing[1]
        )
        return InputError(_unprintable(text, document))
    found = _first_refused(pieces)
    if found is None:
        return TensionlibError(f"the package cannot be set: {refused}\n{refused.diagnostic}")
    (place, kind, content), why = found
    shown = "" if kind == "picture" else f" {_short(content, 60)!r}"
    return InputError(f"{place}: the {kind}{shown} cannot be set: {why}")


def _first_refused(pieces: _Pieces) -> tuple[tuple[str, str, str], _Refused] | None:
    """The first piece that cannot be set by itself, found by halving, and why."""

    def refusal(count: int) -> _Refused | None:
        data = {
            "date": [UNDATED.year, UNDATED.month, UNDATED.day],
            "pieces": [
                {"kind": kind, "content": content} for _, kind, content in pieces.markup[:count]
            ],
        }
        try:
            _compile("probe.typ", data, pieces.files)
        except _Refused as refused:
            return refused
        return None

    good, bad = 0, len(pieces.markup)
    why = refusal(bad)
    if why is None:
        return None
    while bad - good > 1:
        middle = (good + bad) // 2
        if (refused := refusal(middle)) is None:
            good = middle
        else:
            bad, why = middle, refused
    return pieces.markup[bad - 1], why


def _unprintable(text: str, document: Document) -> str:
    code = " ".join(f"U+{ord(character):04X}" for character in text)
    for place, words in _texts(document):
        if text in words:
            at = words.index(text)
            near = _line(words[max(0, at - 30) : at + 30])
            return f"{place}: no font has the character {text!r} ({code}) of {near!r}; replace it"
    return f"no font has the character {text!r} ({code}) of the notebook; replace it"


def _texts(document: Document) -> Iterator[tuple[str, str]]:
    """Every text a package prints, with the words that say where it stands."""
    for key, value in document.project.items():
        for words in _strings(value):
            yield f"project {key}", words
    yield "notebook name", document.name
    for block in document.blocks:
        place = f"cell {block.cell}"
        if isinstance(block, Prose):
            yield place, block.markdown
        elif isinstance(block, Code):
            yield place, block.source
        elif isinstance(block, Printed):
            yield place, block.text
        elif isinstance(block, Equations):
            yield from ((place, row) for row in block.rows)
        elif isinstance(block, Picture) and block.kind == "svg":
            yield f"{place}, picture", block.data.decode(errors="replace")
        elif isinstance(block, Calculated | Scheduled):
            for words in _strings(block.record):
                yield f"{place}, {block.record.get('mark', 'schedule')}", words
    for attachment in document.attachments:
        yield "name of an attached file", attachment.name


def _strings(value: Any) -> Iterator[str]:
    if isinstance(value, str):
        yield value
    elif isinstance(value, Mapping):
        for one in value.values():
            yield from _strings(one)
    elif isinstance(value, list | tuple):
        for one in value:
            yield from _strings(one)
