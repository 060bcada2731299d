"""Issuing from a notebook file to a PDF, whole or not at all; the same through nbconvert."""

from __future__ import annotations

import io
import json
import os
import subprocess
import sys
from importlib.metadata import PackageNotFoundError, distribution

import nbformat
import pytest

from tensionlib.errors import InputError
from tensionlib.package.execute import NotebookError
from tensionlib.package.issue import NotPassingError, issue

pypdf = pytest.importorskip("pypdf")
for needed in ("typst", "pypandoc", "nbclient", "ipykernel", "nbconvert"):
    pytest.importorskip(needed)

from tensionlib.package.exporter import PackageExporter  # noqa: E402

SHOW = """\
import json
from IPython.display import display
display({{"{mimetype}": json.loads({record!r}), "text/plain": "record"}}, raw=True)"""


@pytest.fixture
def written(make, tmp_path):
    """Writes a notebook that, when run, shows the records it is given."""

    def written(*records, name="canopy.ipynb", more=()):
        cells = [make.markdown("# Canopy")]
        cells += [
            nbformat.v4.new_code_cell(
                SHOW.format(mimetype=make.mimetype, record=json.dumps(record))
            )
            for record in records
        ]
        cells += [nbformat.v4.new_code_cell(source) for source in more]
        path = tmp_path / name
        nbformat.write(make.notebook(*cells), path)
        return path

    return written


def names(folder):
    return sorted(path.name for path in folder.iterdir())


def test_a_notebook_becomes_a_package_beside_it_and_stays_as_it_is(written, make, tmp_path):
    path = written(make.project(), make.calculation())
    before = path.read_bytes()
    pdf = issue(path, progress=False)
    assert pdf == tmp_path / "canopy.pdf"
    assert path.read_bytes() == before
    assert names(tmp_path) == ["canopy.ipynb", "canopy.pdf"]
    reader = pypdf.PdfReader(pdf)
    assert "canopy.ipynb" in reader.attachments
    assert "RB1 – roof brace" in " ".join(page.extract_text() for page in reader.pages)


def test_two_runs_give_the_same_bytes(written, make, tmp_path):
    path = written(
        make.project(), make.calculation(), more=["print(object())", "{'b', 'a', 'd', 'c'}"]
    )
    first = issue(path, tmp_path / "first.pdf", progress=False)
    second = issue(path, tmp_path / "second.pdf", progress=False)
    assert first.read_bytes() == second.read_bytes()


def test_the_output_may_be_a_file_or_a_folder_and_the_paper_chosen(written, make, tmp_path):
    path = written(make.project())
    folder = tmp_path / "issued"
    folder.mkdir()
    assert issue(path, folder, progress=False) == folder / "canopy.pdf"
    pdf = issue(path, folder / "canopy-B.pdf", paper="Letter", progress=False)
    assert float(pypdf.PdfReader(pdf).pages[0].mediabox.width) == pytest.approx(612)


def test_a_member_that_does_not_pass_is_issued_only_when_that_is_allowed(written, make, tmp_path):
    path = written(
        make.calculation("RB1"),
        make.calculation("RB2", word="FAIL"),
        make.calculation("RB3", word="NOT COVERED"),
    )
    with pytest.raises(NotPassingError) as caught:
        issue(path, progress=False)
    assert caught.value.marks == (("RB2", "FAIL"), ("RB3", "NOT COVERED"))
    assert "RB2: 150x90x10 UA" in str(caught.value)
    assert "RB1:" not in str(caught.value)
    assert "allow_failing=True" in str(caught.value)
    assert names(tmp_path) == ["canopy.ipynb"]
    assert issue(path, progress=False, allow_failing=True).exists()


def test_a_failing_cell_leaves_the_old_package_whole_and_nothing_else(written, tmp_path):
    path = written(more=["1/0"])
    (tmp_path / "canopy.pdf").write_bytes(b"old")
    with pytest.raises(
        NotebookError, match=r"canopy\.ipynb: cell 2 stopped with ZeroDivisionError"
    ):
        issue(path, progress=False)
    assert (tmp_path / "canopy.pdf").read_bytes() == b"old"
    assert names(tmp_path) == ["canopy.ipynb", "canopy.pdf"]


def test_a_package_that_cannot_be_set_leaves_the_old_one_whole(written, make, tmp_path):
    path = written(make.calculation(title="brace 😀"))
    (tmp_path / "canopy.pdf").write_bytes(b"old")
    with pytest.raises(InputError, match="cell 2, RB1: no font has the character"):
        issue(path, progress=False)
    assert names(tmp_path) == ["canopy.ipynb", "canopy.pdf"]
    assert (tmp_path / "canopy.pdf").read_bytes() == b"old"


@pytest.mark.parametrize(
    ("notebook", "arguments", "message"),
    [
        ("missing.ipynb", {}, "notebook: got .*missing.ipynb'; the path of a notebook"),
        ("words.txt", {}, "notebook: got .*words.txt'"),
        ("broken.ipynb", {}, "notebook: broken.ipynb is not a notebook"),
        ("canopy.ipynb", {"output": "canopy.docx"}, "output: got 'canopy.docx'.*ends in .pdf"),
        ("canopy.ipynb", {"output": "no/such/a.pdf"}, "output: the folder 'no/such' does not"),
        ("canopy.ipynb", {"paper": "A3"}, "paper: got 'A3'; give 'A4' or 'Letter'"),
    ],
)
def test_what_cannot_be_issued_is_refused_before_anything_runs(
    written, tmp_path, monkeypatch, notebook, arguments, message
):
    written(more=["open('ran', 'w')"])
    (tmp_path / "words.txt").write_text("words")
    (tmp_path / "broken.ipynb").write_text("{")
    monkeypatch.chdir(tmp_path)
    with pytest.raises(InputError, match=message):
        issue(tmp_path / notebook, progress=False, **arguments)
    assert not (tmp_path / "ran").exists()


def test_it_can_be_called_while_an_event_loop_runs(written, make):
    import asyncio

    path = written(make.calculation())

    async def inside():
        return issue(path, progress=False)

    assert asyncio.run(inside()).exists()


# nbconvert --------------------------------------------------------------------------------------


def test_the_exporter_makes_the_same_package_from_an_executed_notebook(make, tmp_path):
    notebook = make.notebook(
        make.markdown("# Canopy"),
        make.code(make.shown(make.project())),
        make.code(make.shown(make.calculation())),
    )
    (tmp_path / "canopy.toml").write_text("a = 1")
    path = tmp_path / "canopy.ipynb"
    nbformat.write(notebook, path)
    pdf, resources = PackageExporter().from_filename(str(path))
    assert resources["output_extension"] == ".pdf"
    reader = pypdf.PdfReader(io.BytesIO(pdf))
    assert sorted(reader.attachments) == ["canopy.ipynb", "canopy.toml", "record.json"]


def test_the_exporter_reads_no_file_for_a_notebook_that_lies_nowhere(make, tmp_path, monkeypatch):
    (tmp_path / "canopy.toml").write_text("a = 1")
    monkeypatch.chdir(tmp_path)
    notebook = make.notebook(make.code(make.shown(make.project())))
    pdf, _ = PackageExporter(paper="Letter").from_notebook_node(notebook)
    reader = pypdf.PdfReader(io.BytesIO(pdf))
    assert sorted(reader.attachments) == ["Notebook.ipynb", "record.json"]
    assert float(reader.pages[0].mediabox.width) == pytest.approx(612)


def test_nbconvert_runs_and_exports_a_notebook_from_the_command_line(written, make, tmp_path):
    path = written(make.calculation())
    environment = {**os.environ, "PYTHONPATH": os.pathsep.join(sys.path)}
    command = [sys.executable, "-m", "nbconvert", "--execute", "--to"]
    subprocess.run(
        [*command, "tensionlib.package.exporter.PackageExporter", path.name],
        cwd=tmp_path,
        env=environment,
        check=True,
        capture_output=True,
    )
    text = " ".join(page.extract_text() for page in pypdf.PdfReader(tmp_path / "canopy.pdf").pages)
    assert "RB1 – roof brace" in text


def test_the_exporter_is_found_by_its_name():
    try:
        known = distribution("tensionlib").entry_points
    except PackageNotFoundError:
        pytest.skip("tensionlib is not installed here, only on the path")
    (entry,) = known.select(group="nbconvert.exporters", name="tensionlib-package")
    assert entry.load() is PackageExporter


def test_without_nbconvert_the_extra_is_named():
    script = (
        "import sys; sys.modules['nbconvert'] = None\n"
        "from tensionlib.errors import TensionlibError\n"
        "try:\n"
        "    import tensionlib.package.exporter\n"
        "except TensionlibError as error:\n"
        "    print(error)\n"
    )
    environment = {**os.environ, "PYTHONPATH": os.pathsep.join(sys.path)}
    ran = subprocess.run(
        [sys.executable, "-c", script], env=environment, capture_output=True, text=True, check=True
    )
    assert 'pip install "tensionlib[package]"' in ran.stdout


def test_the_modules_of_issuing_load_no_extra_by_themselves():
    script = (
        "import sys\n"
        "import tensionlib.package.issue, tensionlib.package.typeset\n"
        "heavy = {'nbconvert', 'nbclient', 'nbformat', 'typst', 'pypandoc', 'IPython'}\n"
        "print(sorted(heavy & set(sys.modules)))\n"
    )
    environment = {**os.environ, "PYTHONPATH": os.pathsep.join(sys.path)}
    ran = subprocess.run(
        [sys.executable, "-c", script], env=environment, capture_output=True, text=True, check=True
    )
    assert ran.stdout == "[]\n"
