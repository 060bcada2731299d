"""Running a notebook from top to bottom in a kernel of its own."""

from __future__ import annotations

import os
import sys
import tempfile
from pathlib import Path
from typing import TYPE_CHECKING, Any, TextIO

from tensionlib.errors import TensionlibError
from tensionlib.package.document import plain

if TYPE_CHECKING:
    from nbformat import NotebookNode

# JupyterLab tells kernels by this variable that somebody is looking. Nobody is looking here, also
# when a notebook is issued from a cell of another one.
_SOMEBODY_LOOKS = "JPY_SESSION_NAME"


class NotebookError(TensionlibError):
    """A notebook that did not run to its end."""


def execute(
    notebook: NotebookNode, folder: Path, name: str = "notebook", progress: bool = True
) -> NotebookNode:
    """The notebook with the outputs of a fresh run; the one given is left as it is.

    Parameters
    ----------
    notebook : NotebookNode
        Of nbformat 4.
    folder : Path
        The working folder of the run: the notebook's own.
    name : str
        What messages and the progress bar call the notebook.
    progress : bool
        Whether to show a progress bar, on standard error where that is a terminal.

    Raises
    ------
    NotebookError
        For a cell that raises, naming it by its place counted from 1, or a kernel that is not
        there or dies.
    """
    try:
        from nbclient import NotebookClient
        from nbclient.exceptions import CellExecutionError, DeadKernelError
        from traitlets.config import Config
    except ImportError as missing:
        raise TensionlibError(
            'running a notebook needs nbclient and ipykernel: pip install "tensionlib[package]"'
        ) from missing
    from copy import deepcopy

    running = deepcopy(notebook)
    bar = ProgressBar(name, len(running.cells), sys.stderr if progress else None)
    at = 0

    def started(cell: Any, cell_index: int) -> None:
        nonlocal at
        at = cell_index + 1
        bar.show(at)

    environment = {key: text for key, text in os.environ.items() if key != _SOMEBODY_LOOKS}
    # The order of sets of text follows this seed; a package must not change from run to run.
    environment["PYTHONHASHSEED"] = "0"
    # The sockets lie in this folder; a relative name would mean another place to the kernel.
    with tempfile.TemporaryDirectory() as sockets:
        config = Config()
        config.KernelManager.connection_file = os.path.join(sockets, "kernel.json")
        if sys.platform != "win32":
            # Sockets of the file system: no port is opened, and nobody else can listen.
            config.KernelManager.transport = "ipc"
        client = NotebookClient(
            running,
            config=config,
            kernel_name=_kernel(running),
            resources={"metadata": {"path": str(folder)}},
            timeout=None,
            record_timing=False,
            coalesce_streams=True,
            on_cell_start=started,
        )
        try:
            client.execute(env=environment)
        except CellExecutionError as error:
            why = plain(f"{error.ename}: {error.evalue}")
            raise NotebookError(f"{name}: cell {at} stopped with {why}") from None
        except DeadKernelError:
            raise NotebookError(f"{name}: the kernel died in cell {at}") from None
        finally:
            bar.close()
    running.metadata.pop("widgets", None)
    return running


def _kernel(notebook: NotebookNode) -> str:
    """The kernel a notebook asks for, or this Python where that kernel is not installed here."""
    from jupyter_client.kernelspec import KernelSpecManager

    asked = str(notebook.metadata.get("kernelspec", {}).get("name", "python3"))
    language = notebook.metadata.get("kernelspec", {}).get("language", "python")
    installed = KernelSpecManager().find_kernel_specs()
    if asked in installed:
        return asked
    if language != "python":
        raise NotebookError(f"the kernel {asked!r} ({language}) is not installed here")
    if "python3" not in installed:
        raise NotebookError('no Python kernel is installed here: pip install "tensionlib[package]"')
    return "python3"


class ProgressBar:
    """One line that says which cell runs, on a terminal; nothing anywhere else."""

    WIDTH = 24

    def __init__(self, name: str, cells: int, stream: TextIO | None) -> None:
        self._name = name
        self._cells = cells
        self._stream = stream if stream is not None and stream.isatty() else None

    def show(self, cell: int) -> None:
        if self._stream is not None:
            done = self.WIDTH * (cell - 1) // max(self._cells, 1)
            bar = "█" * done + "░" * (self.WIDTH - done)
            self._stream.write(f"\r{self._name}  {bar}  cell {cell} of {self._cells} ")
            self._stream.flush()

    def close(self) -> None:
        if self._stream is not None:
            self._stream.write("\r\x1b[K")
            self._stream.flush()
