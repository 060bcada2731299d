"""A calculation in JupyterLab, in a real browser, without a network."""

from __future__ import annotations

import json
import os
import shutil
import socket
import subprocess
import sys
import time
import urllib.error
import urllib.request
from collections.abc import Iterator
from io import BytesIO
from pathlib import Path

import pytest

for package in ("playwright", "jupyterlab", "pypdf"):
    pytest.importorskip(package, reason=f"{package} is not installed: no browser tests")
nbformat = pytest.importorskip("nbformat", reason="nbformat is not installed: no browser tests")

CHROMIUM = shutil.which("chromium") or shutil.which("chromium-browser")
SWITCHES = [
    "--headless",
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
]
BRACE = """
import tensionlib as tl

end = tl.Bolted(
    to="long leg", bolts="M20 8.8/S", threads="in shear plane", per_line=3, pitch="70 mm",
    gauge="55 mm", end_distance="40 mm", plate=tl.Gusset("12 mm", "AS/NZS 3678 250"))
brace = tl.Member("RB1", "150x90x10 UA", "AS/NZS 3679.1 300", "4.6 m", end, title="brace <b>$x$")
tl.design(brace, "250 kN")
"""
FAILING = """
two = tl.Bolted(
    to="long leg", bolts="M20 8.8/S", threads="in shear plane", lines=2, per_line=2, pitch="80 mm",
    gauge="50 mm", line_spacing="60 mm", stagger="40 mm", end_distance="40 mm",
    plate=tl.Gusset("12 mm", "AS/NZS 3678 250", width="260 mm"))
wide = tl.Member("RB6", "150x100x10 UA", "AS/NZS 3679.1 300", "5.2 m", two)
tl.design(wide, "700 kN", view=tl.US)
"""

pytestmark = [
    pytest.mark.browser,
    pytest.mark.skipif(
        CHROMIUM is None, reason="no Chromium on this machine: install one to run browser tests"
    ),
]


def _notebook():
    cells = [nbformat.v4.new_code_cell(source) for source in (BRACE, FAILING)]
    kernel = {"name": "python3", "display_name": "Python 3", "language": "python"}
    return nbformat.v4.new_notebook(cells=cells, metadata={"kernelspec": kernel})


@pytest.fixture(scope="module")
def server(tmp_path_factory) -> Iterator[str]:
    """JupyterLab on a free port of this machine, with a configuration of its own."""
    home = tmp_path_factory.mktemp("lab")
    work = home / "work"
    work.mkdir()
    nbformat.write(_notebook(), work / "brace.ipynb")
    quiet = home / "settings" / "@jupyterlab" / "apputils-extension"
    quiet.mkdir(parents=True)
    (quiet / "notification.jupyterlab-settings").write_text(
        json.dumps({"fetchNews": "false", "checkForUpdates": False})
    )
    folders = {
        f"JUPYTER_{name.upper()}_DIR": str(home / name) for name in ("config", "data", "runtime")
    }
    folders |= {
        "JUPYTERLAB_SETTINGS_DIR": str(home / "settings"),
        "JUPYTERLAB_WORKSPACES_DIR": str(home / "workspaces"),
    }
    with socket.socket() as free:
        free.bind(("127.0.0.1", 0))
        port = free.getsockname()[1]
    process = subprocess.Popen(
        [
            sys.executable,
            "-m",
            "jupyterlab",
            "--no-browser",
            "--ip=127.0.0.1",
            f"--port={port}",
            "--ServerApp.port_retries=0",
            f"--ServerApp.root_dir={work}",
            "--IdentityProvider.token=tok",
            "--allow-root",
            "--LabApp.extension_manager=readonly",
        ],
        env=os.environ | folders,
        stdout=subprocess.DEVNULL,
        stderr=subprocess.DEVNULL,
    )
    try:
        _wait_for(f"http://127.0.0.1:{port}/api?token=tok", process)
        yield f"http://127.0.0.1:{port}"
    finally:
        process.terminate()
        process.wait(timeout=20)


def _wait_for(address: str, process: subprocess.Popen[bytes]) -> None:
    for _ in range(200):
        if process.poll() is not None:
            pytest.fail(f"JupyterLab stopped with code {process.returncode}")
        try:
            with urllib.request.urlopen(address, timeout=2):
                return
        except (urllib.error.URLError, OSError):
            time.sleep(0.2)
    pytest.fail("JupyterLab did not answer in 40 s")


@pytest.fixture(scope="module")
def page(server):
    """The notebook, opened and run."""
    from playwright.sync_api import sync_playwright

    with sync_playwright() as playwright:
        browser = playwright.chromium.launch(executable_path=CHROMIUM, args=SWITCHES)
        page = browser.new_page(viewport={"width": 1200, "height": 1600})
        page.outside, page.errors = [], []
        page.on(
            "request",
            lambda request: (
                page.outside.append(request.url)
                if not request.url.startswith((server, "ws://127.0.0.1", "data:", "blob:"))
                else None
            ),
        )
        page.on("pageerror", lambda error: page.errors.append(str(error)))
        page.goto(f"{server}/lab/tree/brace.ipynb?token=tok&reset")
        page.locator("text=/Python 3.*Idle/").first.wait_for(timeout=60_000)
        page.click("text=Run >> nth=0")
        page.click("text=Run All Cells")
        page.locator(".tl-calc").nth(1).wait_for(timeout=60_000)
        yield page
        browser.close()


def _brace(page):
    return page.locator(".tl-calc").first


def _open_all(page):
    page.evaluate("document.querySelectorAll('.tl-calc details').forEach(d => d.open = true)")


def _unset_mathematics(page) -> list[str]:
    """Formulas that show as nothing, as source, or with a numerator beside its denominator."""
    return page.evaluate(
        """[...document.querySelectorAll('.tl-calc math')].filter(m => {
            const box = m.getBoundingClientRect();
            const flat = [...m.querySelectorAll('mfrac')].some(f =>
                f.children[0].getBoundingClientRect().bottom >
                f.children[1].getBoundingClientRect().top + 1);
            return !box.width || !box.height || flat || /[\\\\$]/.test(m.textContent);
        }).map(m => m.textContent)"""
    )


def _too_wide(page) -> list[str]:
    """What runs out of its calculation, and steps that are cut off by their column."""
    return page.evaluate(
        """[...document.querySelectorAll('.tl-calc')].flatMap(c => {
            const right = c.getBoundingClientRect().right + 1;
            return [...c.querySelectorAll('.tl-line, .tl-steps, table, svg')].filter(e =>
                e.getBoundingClientRect().right > right ||
                (e.matches('.tl-steps') && e.scrollWidth > e.clientWidth + 1));
        }).map(e => `${e.scrollWidth} in ${e.clientWidth}: ${e.textContent}`)"""
    )


def test_headline_verdict_and_sketch_are_seen(page):
    headline = _brace(page).locator(".tl-headline")
    assert "PASS, governed by bolt shear (9.3.2.1), utilisation 0.900" in headline.inner_text()
    assert _brace(page).locator("figure svg").is_visible()
    assert "net section" in _brace(page).locator("figure svg").inner_html()
    assert "FAIL, by" in page.locator(".tl-headline").nth(1).inner_text()


def test_user_text_stays_literal(page):
    assert "brace <b>$x$" in _brace(page).locator(".tl-headline").inner_text()
    assert page.locator(".tl-calc mjx-container").count() == 0
    assert page.locator(".tl-calc b").count() == 0


def test_checks_table_is_open_and_its_numbers_stand_right(page):
    table = _brace(page).locator(".tl-checks")
    assert table.is_visible()
    row = table.locator("tr", has_text="bolt shear")
    assert "277.9 kN" in row.inner_text()
    aligned = [
        cell.evaluate("cell => getComputedStyle(cell).textAlign")
        for cell in row.locator("td").all()
    ]
    assert aligned == ["left"] * 3 + ["right"] * 3 + ["left"]


def test_parts_fold_by_mouse_and_by_keyboard(page):
    title = page.locator("summary", has_text="Net section")
    part = _brace(page).locator("details", has=title)
    lines = part.locator(".tl-lines")
    assert not lines.is_visible()
    part.locator("summary").click()
    assert lines.is_visible()
    part.locator("summary").click()
    assert not lines.is_visible()
    # From the part before it, Tab leads here and Enter opens it.
    _brace(page).locator("summary", has_text="Member").first.focus()
    page.keyboard.press("Tab")
    assert page.evaluate("document.activeElement.textContent") == "Net section"
    page.keyboard.press("Enter")
    assert lines.is_visible()


def test_mathematics_is_set_and_none_is_left_raw(page):
    _open_all(page)
    assert page.locator(".tl-calc math").count() > 200
    assert page.locator(".tl-calc mfrac").count() > 5
    assert _unset_mathematics(page) == []
    shown = page.locator(".tl-lines").all_inner_texts()
    assert shown
    assert not [text for text in shown if "$" in text or "\\" in text]


@pytest.mark.parametrize("width", [1400, 1300, 1200, 1000])
def test_no_line_runs_out_of_the_page_or_is_cut_off(page, width):
    page.set_viewport_size({"width": width, "height": 1600})
    # JupyterLab's own margins take some 450 px; it follows a new size a moment later.
    page.wait_for_function(
        "w => Math.abs(document.querySelector('.tl-calc').clientWidth + 450 - w) < 40", arg=width
    )
    _open_all(page)
    assert _too_wide(page) == []


def test_nothing_came_from_outside_and_nothing_broke(page):
    assert page.outside == []
    assert page.errors == []


@pytest.fixture(scope="module")
def exported(page, tmp_path_factory):
    """nbconvert's own HTML of the notebook, opened where no address can be reached."""
    from nbconvert.exporters import HTMLExporter

    from tensionlib.package.execute import execute

    folder = tmp_path_factory.mktemp("exported")
    html, _ = HTMLExporter().from_notebook_node(execute(_notebook(), Path(folder), progress=False))
    file = folder / "brace.html"
    file.write_text(html, encoding="utf-8")
    other = page.context.browser.new_page(viewport={"width": 1200, "height": 1600})
    other.route("**/*", lambda r: r.continue_() if r.request.url.startswith("file:") else r.abort())
    other.goto(file.as_uri(), wait_until="domcontentloaded")
    yield other
    other.close()


def test_exported_html_shows_the_same_without_a_network(page, exported):
    for reading in (page, exported):
        _open_all(reading)
    shown, there = (
        reading.locator(".tl-headline, .tl-line, .tl-calc tr").all_text_contents()
        for reading in (page, exported)
    )
    assert len(shown) > 200
    assert shown == there
    assert _unset_mathematics(exported) == []
    assert _too_wide(exported) == []


def test_print_has_every_part_open_and_the_plain_copy_hidden(exported):
    from pypdf import PdfReader

    exported.evaluate("document.querySelectorAll('.tl-calc details').forEach(d => d.open = false)")
    exported.emulate_media(media="print")
    lines = exported.locator(".tl-calc .tl-line")
    assert lines.count() > 100
    assert all(line.is_visible() for line in lines.all())
    assert exported.locator(".tl-text").first.is_hidden()
    exported.set_viewport_size({"width": 680, "height": 1000})
    assert _too_wide(exported) == []
    for paper in ("A4", "Letter"):
        pages = PdfReader(BytesIO(exported.pdf(format=paper))).pages
        text = "".join(page.extract_text() for page in pages)
        assert text.count("PASS, governed by") == 1
        for said in ("Correction factor", "277.88", "Bolt distances", "Not checked", "9.3.2.4"):
            assert said in text
