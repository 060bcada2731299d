"""Issuing: from a notebook to its calculation package, whole or not at all."""

from __future__ import annotations

import os
from pathlib import Path
from typing import Any

from tensionlib.errors import InputError, TensionlibError
from tensionlib.package.document import Record, read
from tensionlib.package.execute import execute
from tensionlib.package.files.atomic import write_atomic
from tensionlib.package.typeset import PAPERS


class NotPassingError(TensionlibError):
    """Calculations that do not pass, where only passing ones may be issued.

    `marks` holds the mark and the verdict of each.
    """

    def __init__(self, records: tuple[Record, ...]) -> None:
        self.marks = tuple((str(r["mark"]), str(r["verdict"]["word"])) for r in records)
        super().__init__(
            "nothing was issued, because these do not pass:\n"
            + "\n".join(f"  {record['headline']}" for record in records)
            + "\nChange them, or issue all the same with allow_failing=True (--allow-failing)."
        )


def issue(
    notebook_path: str | os.PathLike[str],
    output: str | os.PathLike[str] | None = None,
    paper: str | None = None,
    progress: bool = True,
    *,
    allow_failing: bool = False,
) -> Path:
    """Execute a notebook and write its calculation package; the notebook stays as it is.

    Parameters
    ----------
    notebook_path : path
        A notebook (.ipynb). It runs in its own folder.
    output : path, optional
        The PDF to write, or a folder for it; beside the notebook and under its name unless given.
    paper : str, optional
        "A4" or "Letter"; the project's own, else A4, unless given.
    progress : bool
        Whether to show a progress bar on a terminal.
    allow_failing : bool
        Issue also when a calculation fails or is not covered; the package says so in words.

    Returns
    -------
    Path
        The PDF.

    Raises
    ------
    InputError
        For a notebook or paper that is not there, or a cell that cannot be printed.
    NotebookError
        For a cell that raises.
    NotPassingError
        For calculations that do not pass, unless allowed.
    TensionlibError
        When an extra package is missing or the file cannot be written. A PDF that stood there
        before is then still whole.
    """
    source = Path(notebook_path)
    target = _target(source, output)
    if paper is not None and paper not in PAPERS:
        raise InputError(f"paper: got {paper!r}; give 'A4' or 'Letter'")
    try:
        import nbformat
    except ImportError as missing:
        raise TensionlibError(
            'issuing a notebook needs nbformat: pip install "tensionlib[package]"'
        ) from missing
    from tensionlib.package.exporter import PackageExporter

    read_notebook: Any = nbformat.read
    exporter_class: Any = PackageExporter
    try:
        notebook = read_notebook(source, as_version=4)
    except (nbformat.reader.NotJSONError, nbformat.ValidationError, UnicodeDecodeError) as error:
        reason = str(error).splitlines()[0][:200]
        raise InputError(f"notebook: {source.name} is not a notebook: {reason}") from None
    executed = execute(notebook, source.parent, source.name, progress)
    failing = read(executed, source.stem, source.parent, attach=False).failing
    if failing and not allow_failing:
        raise NotPassingError(failing)
    exporter = exporter_class(paper=paper or "")
    about = {"metadata": {"name": source.stem, "path": str(source.parent)}}
    pdf, _ = exporter.from_notebook_node(executed, about)
    write_atomic(target, pdf)
    return target


def _target(source: Path, output: str | os.PathLike[str] | None) -> Path:
    if source.suffix != ".ipynb" or not source.is_file():
        raise InputError(
            f"notebook: got {str(source)!r}; the path of a notebook that exists is due, for example"
            " 'canopy-package.ipynb'"
        )
    if output is None:
        return source.with_suffix(".pdf")
    target = Path(output)
    if target.is_dir():
        return target / f"{source.stem}.pdf"
    if target.suffix.lower() != ".pdf":
        raise InputError(f"output: got {str(target)!r}; a name that ends in .pdf is due")
    if not target.parent.is_dir():
        raise InputError(f"output: the folder {str(target.parent)!r} does not exist")
    return target
