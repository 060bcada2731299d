"""The exporter that nbconvert finds: ``jupyter nbconvert --to tensionlib-package``."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Any

from tensionlib.errors import TensionlibError
from tensionlib.package.document import read
from tensionlib.package.typeset import typeset

if TYPE_CHECKING:
    from nbformat import NotebookNode

try:
    from nbconvert.exporters import Exporter
    from traitlets import Enum
except ImportError as missing:
    raise TensionlibError(
        'exporting a notebook needs nbconvert: pip install "tensionlib[package]"'
    ) from missing


class PackageExporter(Exporter):
    """An executed notebook as a calculation package: PDF/A-3b with its sources attached."""

    output_mimetype = "application/pdf"
    export_from_notebook = "Calculation package (PDF)"

    paper = Enum(
        ["", "A4", "Letter"], "", help="Paper size; the project's own, else A4, unless given."
    ).tag(config=True)

    def _file_extension_default(self) -> str:
        return ".pdf"

    def from_notebook_node(self, nb: NotebookNode, resources: Any = None, **more: Any) -> Any:
        """The PDF of a notebook: its bytes, and the resources.

        Pictures and files to attach are looked for in the folder that `resources` names
        (``metadata.path``, as nbconvert sets it), and nowhere without one.

        Raises
        ------
        InputError
            Naming the cell that cannot be printed.
        TensionlibError
            When typst or pandoc is missing or fails.
        """
        ready, resources = super().from_notebook_node(nb, resources, **more)
        about = resources.get("metadata") or {}
        path = about.get("path")
        # An empty path is the working folder: nbconvert was given a bare file name.
        folder = None if path is None else Path(str(path))
        document = read(ready, str(about.get("name") or "notebook"), folder)
        return typeset(document, self.paper or None), resources
