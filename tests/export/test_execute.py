"""Running notebooks: where, how, and what is said when one stops."""

from __future__ import annotations

import io
import sys

import pytest

from tensionlib.errors import TensionlibError
from tensionlib.package.execute import NotebookError, ProgressBar, execute

pytest.importorskip("nbclient")
pytest.importorskip("ipykernel")


@pytest.fixture
def run(make, tmp_path):
    def run(*sources, **more):
        cells = [make.code(source=source) for source in sources]
        return execute(make.notebook(*cells), tmp_path, "canopy.ipynb", progress=False, **more)

    return run


def test_it_runs_in_the_folder_of_the_notebook_in_a_kernel_nobody_looks_at(
    run, tmp_path, monkeypatch
):
    monkeypatch.setenv("JPY_SESSION_NAME", "somebody.ipynb")
    (tmp_path / "facts.txt").write_text("found")
    executed = run(
        "import os\nprint(open('facts.txt').read(), os.environ.get('JPY_SESSION_NAME'))",
        "print(os.environ['PYTHONHASHSEED'])",
    )
    assert [cell["outputs"][0]["text"] for cell in executed["cells"]] == ["found None\n", "0\n"]


def test_the_notebook_given_stays_as_it_was(make, tmp_path):
    notebook = make.notebook(make.code(source="1 + 1"))
    executed = execute(notebook, tmp_path, progress=False)
    assert notebook["cells"][0]["outputs"] == []
    assert executed["cells"][0]["outputs"][0]["data"]["text/plain"] == "2"
    assert "execution" not in executed["cells"][0]["metadata"]


def test_a_cell_that_raises_is_named_by_its_place_among_all_cells(make, tmp_path):
    notebook = make.notebook(
        make.markdown("a"), make.code(source="1"), make.code(source="raise ValueError('no good')")
    )
    with pytest.raises(
        NotebookError, match=r"^canopy\.ipynb: cell 3 stopped with ValueError: no good$"
    ):
        execute(notebook, tmp_path, "canopy.ipynb", progress=False)


def test_a_kernel_that_dies_is_named_with_its_cell(run):
    with pytest.raises(NotebookError, match=r"canopy\.ipynb: the kernel died in cell 2"):
        run("1", "import os\nos._exit(1)")


def test_an_unknown_python_kernel_is_replaced_and_another_language_refused(make, tmp_path):
    notebook = make.notebook(make.code(source="1 + 1"))
    notebook["metadata"]["kernelspec"]["name"] = "no-such-environment"
    executed = execute(notebook, tmp_path, progress=False)
    assert executed["cells"][0]["outputs"][0]["data"]["text/plain"] == "2"
    notebook["metadata"]["kernelspec"]["language"] = "fortran"
    with pytest.raises(NotebookError, match=r"'no-such-environment' \(fortran\) is not installed"):
        execute(notebook, tmp_path, progress=False)


def test_where_no_python_kernel_is_installed_the_extra_is_named(run, monkeypatch):
    from jupyter_client.kernelspec import KernelSpecManager

    monkeypatch.setattr(KernelSpecManager, "find_kernel_specs", lambda manager: {})
    with pytest.raises(NotebookError, match=r'no Python kernel.*"tensionlib\[package\]"'):
        run("1")


def test_without_nbclient_the_extra_is_named(run, monkeypatch):
    monkeypatch.setitem(sys.modules, "nbclient", None)
    with pytest.raises(TensionlibError, match=r'pip install "tensionlib\[package\]"'):
        run("1")


class Terminal(io.StringIO):
    def isatty(self):
        return True


def test_the_progress_bar_counts_cells_on_a_terminal_and_leaves_nothing_behind():
    terminal = Terminal()
    bar = ProgressBar("canopy.ipynb", 4, terminal)
    bar.show(3)
    assert "canopy.ipynb" in terminal.getvalue()
    assert terminal.getvalue().count("█") == ProgressBar.WIDTH // 2
    assert "cell 3 of 4" in terminal.getvalue()
    bar.close()
    assert terminal.getvalue().endswith("\r\x1b[K")


@pytest.mark.parametrize("stream", [io.StringIO(), None])
def test_the_progress_bar_is_silent_anywhere_else(stream):
    bar = ProgressBar("canopy.ipynb", 4, stream)
    bar.show(1)
    bar.close()
    assert stream is None or stream.getvalue() == ""


def test_the_run_needs_no_network_port(run):
    executed = run("import json, sys\nprint(json.load(open(sys.argv[2]))['transport'])")
    assert executed["cells"][0]["outputs"][0]["text"] == "ipc\n"
