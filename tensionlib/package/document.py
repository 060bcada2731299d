"""What a package prints: the blocks of an executed notebook, in order, and what goes with them.

Read from a notebook are its markdown, the records its outputs carry
(``application/vnd.tensionlib+json``), LaTeX, pictures and plain text. Nothing here knows how a
page looks.

Cells are counted from 1, all kinds alike. The tag ``show-code`` on a code cell prints its source,
the tag ``hide`` leaves out its output (or a markdown cell altogether). Text that a cell wrote to
standard error is not printed.
"""

from __future__ import annotations

import base64
import binascii
import hashlib
import json
import re
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any
from urllib.parse import unquote, urlsplit

from tensionlib.errors import InputError

MIMETYPE = "application/vnd.tensionlib+json"
WIDGET = "application/vnd.jupyter.widget-view+json"
FORMAT_VERSION = 1
# Picture kinds that the typesetter reads, by file suffix and by mimetype.
PICTURE_SUFFIXES = {".svg": "svg", ".png": "png", ".jpg": "jpg", ".jpeg": "jpg"}
PICTURE_TYPES = {"image/svg+xml": "svg", "image/png": "png", "image/jpeg": "jpg"}

Record = Mapping[str, Any]


@dataclass(frozen=True, slots=True)
class Block:
    """One thing the package prints, and the number of the cell it comes from."""

    cell: int


@dataclass(frozen=True, slots=True)
class Prose(Block):
    """Markdown, with the pictures attached to its cell by name."""

    markdown: str
    attached: Mapping[str, Picture]


@dataclass(frozen=True, slots=True)
class Code(Block):
    """The source of a cell tagged ``show-code``."""

    source: str


@dataclass(frozen=True, slots=True)
class Printed(Block):
    """Plain text output."""

    text: str


@dataclass(frozen=True, slots=True)
class Equations(Block):
    """LaTeX output, one equation a row, without ``$`` and without alignment marks."""

    rows: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Picture(Block):
    """A plot, or a picture of the prose."""

    kind: str
    data: bytes
    alt: str


@dataclass(frozen=True, slots=True)
class Calculated(Block):
    """The record of one calculation."""

    record: Record


@dataclass(frozen=True, slots=True)
class Scheduled(Block):
    """The record of a schedule: its members are calculations."""

    record: Record

    @property
    def members(self) -> tuple[Calculated, ...]:
        return tuple(Calculated(self.cell, member) for member in self.record["members"])


@dataclass(frozen=True, slots=True)
class Attachment:
    """A file that travels inside the PDF."""

    name: str
    data: bytes
    mimetype: str
    relationship: str
    description: str

    @property
    def fingerprint(self) -> str:
        return hashlib.sha256(self.data).hexdigest()


@dataclass(frozen=True, slots=True)
class Document:
    """A package before it is set.

    `folder` is where pictures and attached files may be read from, or None for a notebook that
    lies in no folder; nothing outside it is ever read.
    """

    name: str
    folder: Path | None
    blocks: tuple[Block, ...]
    project: Record
    attachments: tuple[Attachment, ...]

    @property
    def calculations(self) -> tuple[Calculated, ...]:
        """Every calculation that stands in the package, each once, in order."""
        seen: set[tuple[str, str]] = set()
        found = []
        for block in self.blocks:
            for calculated in _calculations(block):
                if (key := identity(calculated.record)) not in seen:
                    seen.add(key)
                    found.append(calculated)
        return tuple(found)

    @property
    def failing(self) -> tuple[Record, ...]:
        """Records whose verdict is anything but a pass; a calculation without checks has none."""
        records = [calculated.record for calculated in self.calculations]
        return tuple(r for r in records if r["verdict"]["word"] and not r["verdict"]["passes"])


def identity(record: Record) -> tuple[str, str]:
    """What tells one calculation from another: its mark and the fingerprint of its inputs."""
    return str(record["mark"]), str(record.get("provenance", {}).get("inputs_hash", ""))


def read(
    notebook: Mapping[str, Any],
    name: str = "notebook",
    folder: Path | None = None,
    *,
    attach: bool = True,
) -> Document:
    """The document an executed notebook (nbformat 4) makes.

    `attach` False leaves the files out, for who only asks what the notebook says.

    Raises
    ------
    InputError
        For a code cell that has not been run or that ended in an error, a record this version
        cannot read, or two project records that differ.
    """
    notebook = settled(notebook)
    blocks: list[Block] = []
    projects: list[tuple[int, Record]] = []
    for number, cell in enumerate(notebook["cells"], start=1):
        tags = cell["metadata"].get("tags", [])
        if cell["cell_type"] == "markdown" and "hide" not in tags and _text(cell["source"]).strip():
            blocks.append(Prose(number, _text(cell["source"]), _attached(cell, number)))
        elif cell["cell_type"] == "code":
            _refuse_not_run(cell, number, tags)
            if "show-code" in tags:
                blocks.append(Code(number, _text(cell["source"]).rstrip()))
            for output in cell["outputs"]:
                record = _record(output, number)
                if record is not None and record["kind"] == "project":
                    projects.append((number, record))
                elif "hide" not in tags:
                    blocks += _output(output, record, number)
    return Document(
        name=name,
        folder=folder,
        blocks=tuple(blocks),
        project=_project(projects),
        attachments=_attachments(notebook, name, folder, blocks, projects) if attach else (),
    )


def picture(document: Document, block: Prose, source: str) -> Picture | None:
    """The picture that `source` in the markdown of `block` stands for.

    None for anything that is neither attached to the cell nor a picture file in the notebook's
    folder or below it.
    """
    if source.startswith("attachment:"):
        return block.attached.get(unquote(source.removeprefix("attachment:")))
    kind = PICTURE_SUFFIXES.get(Path(unquote(source)).suffix.lower())
    path = _inside(document.folder, unquote(source))
    if kind is None or path is None or urlsplit(source).scheme:
        return None
    return Picture(block.cell, kind, path.read_bytes(), "")


# Cells and outputs ------------------------------------------------------------------------------


def _refuse_not_run(cell: Mapping[str, Any], number: int, tags: list[str]) -> None:
    if "skip-execution" in tags or not _text(cell["source"]).strip():
        return
    if cell.get("execution_count") is None and not cell["outputs"]:
        raise InputError(
            f"cell {number} has not been run, so the package would lack what it shows;"
            " run the notebook first, or add --execute to jupyter nbconvert"
        )
    for output in cell["outputs"]:
        if output["output_type"] == "error" and "raises-exception" not in tags:
            raise InputError(
                f"cell {number} ended in an error: {output['ename']}: {plain(output['evalue'])}"
            )


def _record(output: Mapping[str, Any], number: int) -> Record | None:
    """The record an output carries, or None: no record, or a kind that is not printed by itself."""
    record = output.get("data", {}).get(MIMETYPE)
    if record is None:
        return None
    if not isinstance(record, Mapping) or record.get("format") != "tensionlib":
        raise InputError(f"cell {number}: {MIMETYPE} holds something other than a record")
    if record.get("version") != FORMAT_VERSION:
        raise InputError(
            f"cell {number}: the record has format version {record.get('version')!r}; this version"
            f" of the library reads {FORMAT_VERSION}; run the notebook again"
        )
    kind = record.get("kind")
    if kind == "calculation":
        _complete(record, number)
    elif kind == "schedule":
        for member in record.get("members", []):
            _complete(member, number)
    elif kind != "project":
        return None
    return record


def _complete(record: Record, number: int) -> None:
    due = ("mark", "headline", "verdict", "inputs", "parts", "checks")
    missing = [key for key in due if key not in record]
    if missing:
        raise InputError(
            f"cell {number}: the record of {record.get('mark', 'a calculation')} lacks"
            f" {', '.join(missing)}; run the notebook again"
        )


def _output(output: Mapping[str, Any], record: Record | None, number: int) -> Iterator[Block]:
    if record is not None:
        yield (Calculated if record["kind"] == "calculation" else Scheduled)(number, record)
        return
    if output["output_type"] == "stream":
        text = plain(_text(output["text"])) if output["name"] == "stdout" else ""
    elif output["output_type"] == "error":
        text = plain(f"{output['ename']}: {output['evalue']}")
    else:
        data = output["data"]
        if "text/latex" in data:
            yield _latex(_text(data["text/latex"]), number)
            return
        for mimetype, kind in PICTURE_TYPES.items():
            if mimetype in data:
                yield Picture(number, kind, _picture_bytes(data[mimetype], kind, number), "plot")
                return
        if "text/markdown" in data:
            yield Prose(number, _text(data["text/markdown"]), {})
            return
        text = plain(_text(data.get("text/plain", "")))
        if text == "None" or _only_object_names(text):
            return
    if text.strip():
        yield Printed(number, text.rstrip())


def _calculations(block: Block) -> tuple[Calculated, ...]:
    if isinstance(block, Calculated):
        return (block,)
    return block.members if isinstance(block, Scheduled) else ()


def _attached(cell: Mapping[str, Any], number: int) -> dict[str, Picture]:
    pictures = {}
    for name, bundle in cell.get("attachments", {}).items():
        for mimetype, kind in PICTURE_TYPES.items():
            if mimetype in bundle:
                data = _picture_bytes(bundle[mimetype], kind, number, attached=True)
                pictures[name] = Picture(number, kind, data, "")
    return pictures


def _picture_bytes(data: Any, kind: str, number: int, attached: bool = False) -> bytes:
    text = _text(data)
    # An SVG output is text; an attachment of any kind is base64.
    if kind == "svg" and not attached:
        return text.encode()
    try:
        return base64.b64decode(text)
    except (binascii.Error, ValueError):
        raise InputError(f"cell {number}: a {kind} picture cannot be decoded") from None


# Text -------------------------------------------------------------------------------------------

_ESCAPES = re.compile(r"\x1b\[[0-9;?]*[ -/]*[@-~]")
_CONTROLS = re.compile(r"[\x00-\x08\x0b-\x1f\x7f-\x9f]")
_ADDRESS = re.compile(r"\b0x[0-9a-fA-F]{6,}\b")
_OBJECT = re.compile(r"\[?<[\w.]+(:| at | object| size ).*>\]?|Text\(.*\)")


def plain(text: str) -> str:
    """Text output without terminal colours, overwritten lines and addresses in memory.

    Addresses change from run to run; the package must not.
    """
    text = _ESCAPES.sub("", text).replace("\r\n", "\n")
    text = "\n".join(line.rstrip("\r").rsplit("\r", 1)[-1] for line in text.split("\n"))
    return _ADDRESS.sub("0x0", _CONTROLS.sub("", text.expandtabs(4)))


def _only_object_names(text: str) -> bool:
    """Whether the text is what Python prints for an object that has no words for itself."""
    return bool(_OBJECT.fullmatch(text.strip()))


def _text(value: Any) -> str:
    """Notebook text, which may be stored as a list of lines."""
    return value if isinstance(value, str) else "".join(value)


_WRAPPINGS = (("$$", "$$"), (r"\[", r"\]"), (r"\(", r"\)"), ("$", "$"))
_ENVIRONMENT = re.compile(
    r"\\begin\{(equation|align|aligned|gather|gathered|split|eqnarray|multline)(\*?)\}"
    r"(.*)\\end\{\1\2\}",
    re.DOTALL,
)

_TOKEN = re.compile(
    r"\\\\\*?(?:\[[^\]]*\])?|\\(?:begin|end)\{[^}]*\}|\\.|[{}&]|[^\\{}&]+|\\", re.DOTALL
)
_RELATIONS = ("=", "<", ">", r"\l", r"\g", r"\a", r"\n")


def _latex(text: str, number: int) -> Block:
    """LaTeX output as equations, or as prose where it is words with mathematics among them."""
    body, wrapped = text.strip(), True
    while wrapped:
        wrapped = False
        for start, end in _WRAPPINGS:
            if body.startswith(start) and body.endswith(end) and len(body) > len(start + end):
                body, wrapped = body[len(start) : -len(end)].strip(), True
        if found := _ENVIRONMENT.fullmatch(body):
            body, wrapped = found[3].strip(), True
        if body.startswith(r"\displaystyle"):
            body, wrapped = body.removeprefix(r"\displaystyle").strip(), True
    if re.search(r"(?<!\\)\$", body):
        return Prose(number, text, {})
    rows = (" ".join(row.split()) for row in _rows(body))
    return Equations(number, tuple(row for row in rows if row))


def _rows(body: str) -> Iterator[str]:
    r"""The rows of an aligned block: parted at ``\\``, but not inside braces or environments.

    A ``&`` that aligns goes; one between columns becomes a space.
    """
    depth, row, marks = 0, "", 0
    tokens = _TOKEN.findall(body)
    for token, following in zip(tokens, [*tokens[1:], ""], strict=True):
        if depth == 0 and token.startswith("\\\\"):
            yield row
            row, marks = "", 0
            continue
        if token == "{" or token.startswith("\\begin{"):
            depth += 1
        elif token == "}" or token.startswith("\\end{"):
            depth -= 1
        if depth == 0 and token == "&":
            marks += 1
            row += "" if marks == 1 or following.lstrip().startswith(_RELATIONS) else r"\qquad "
        else:
            row += token
    yield row


# The project and what is attached ---------------------------------------------------------------


def _project(found: list[tuple[int, Record]]) -> Record:
    if not found:
        return {}
    cell, record = found[-1]
    for other, earlier in found[:-1]:
        if earlier != record:
            raise InputError(
                f"cells {other} and {cell} show two different projects; a package has one"
            )
    return record


def _attachments(
    notebook: Mapping[str, Any],
    name: str,
    folder: Path | None,
    blocks: list[Block],
    projects: list[tuple[int, Record]],
) -> tuple[Attachment, ...]:
    source = json.dumps(notebook, sort_keys=True, indent=1, ensure_ascii=False) + "\n"
    records = [projects[-1][1]] if projects else []
    records += [b.record for b in blocks if isinstance(b, Calculated | Scheduled)]
    record = json.dumps(records, sort_keys=True, indent=1, ensure_ascii=False)
    found = [
        Attachment(
            name=f"{name}.ipynb",
            data=source.encode(),
            mimetype="application/x-ipynb+json",
            relationship="source",
            description="executed notebook",
        ),
        Attachment(
            name="record.json",
            data=record.encode(),
            mimetype="application/json",
            relationship="data",
            description="record of every number",
        ),
    ]
    named = [str(project.get("design_file") or "") for _, project in projects]
    for block in blocks:
        if isinstance(block, Scheduled):
            origin = block.record.get("source") or {}
            named += [str(origin.get(key) or "") for key in ("design_file", "schedule")]
    for file in dict.fromkeys(named):
        path = _inside(folder, file)
        if path is not None:
            data = path.read_bytes()
            found.append(
                Attachment(path.name, data, _mimetype(path), "source", "input of the calculations")
            )
    return tuple(found)


def _mimetype(path: Path) -> str:
    known = {
        ".toml": "application/toml",
        ".csv": "text/csv",
        ".xlsx": "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet",
        ".json": "application/json",
    }
    return known.get(path.suffix.lower(), "application/octet-stream")


def _inside(folder: Path | None, name: str) -> Path | None:
    """The file `name` in `folder` or below it, or None: no such file, or it lies elsewhere."""
    if folder is None or not name or "\0" in name:
        return None
    home = folder.resolve()
    try:
        path = (home / name).resolve()
        inside = path.is_relative_to(home) and path.is_file()
    except OSError:
        return None
    return path if inside and not Path(name).is_absolute() else None


# Equal runs, equal bytes ------------------------------------------------------------------------


def settled(notebook: Mapping[str, Any]) -> dict[str, Any]:
    """The notebook without what changes between two equal runs.

    Timings, widgets and their state, addresses in memory and tracebacks go; pieces of one
    stream, whose number is a matter of luck, are joined. Cells keep their ids; those without one
    are numbered.
    """
    cells = []
    for number, cell in enumerate(notebook["cells"], start=1):
        metadata = {key: value for key, value in cell["metadata"].items() if key != "execution"}
        kept = {**cell, "metadata": metadata, "source": _lines(cell["source"])}
        if notebook["nbformat_minor"] >= 5:
            kept.setdefault("id", f"cell-{number}")
        if cell["cell_type"] == "code":
            kept["outputs"] = _settled_outputs(cell["outputs"])
        cells.append(kept)
    metadata = {key: value for key, value in notebook["metadata"].items() if key != "widgets"}
    return {
        "cells": cells,
        "metadata": metadata,
        "nbformat": notebook["nbformat"],
        "nbformat_minor": notebook["nbformat_minor"],
    }


def _settled_outputs(outputs: list[Mapping[str, Any]]) -> list[dict[str, Any]]:
    kept: list[dict[str, Any]] = []
    for output in outputs:
        kind = output["output_type"]
        if kind == "stream":
            text = _text(output["text"])
            if kept and kept[-1].get("name") == output["name"]:
                text = _text(kept.pop()["text"]) + text
            kept.append({**output, "text": _lines(_ADDRESS.sub("0x0", text))})
        elif kind == "error":
            kept.append({**output, "traceback": []})
        elif WIDGET not in output["data"] or MIMETYPE in output["data"]:
            data = {
                mimetype: _lines(_ADDRESS.sub("0x0", _text(value)))
                if mimetype in ("text/plain", "text/html")
                else value
                for mimetype, value in output["data"].items()
                if mimetype != WIDGET
            }
            kept.append({**output, "data": data})
    return kept


def _lines(text: Any) -> list[str]:
    return _text(text).splitlines(keepends=True)
