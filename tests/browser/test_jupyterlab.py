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
from pathlib import Path

import nbformat
import pytest

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
SOURCE = """
import tensionlib as tl

end = tl.Bolted(
    to="long leg", bolts="M20 8.8/S", threads="in shear plane", per_line=3, pitch="70 mm",
    gauge="55 mm", end_distance="40 mm", plate=tl.Gusset("12 mm", "AS/NZS 3678 250"))
brace = tl.Member("RB1", "125x75x10 UA", "AS/NZS 3679.1 300", "4.6 m", end, title="brace <b>$x$")
tl.design(brace, "250 kN")
"""

pytestmark = [
    pytest.mark.browser,
    pytest.mark.skipif(
        CHROMIUM is None, reason="no Chromium on this machine: install one to run browser tests"
    ),
]


@pytest.fixture(scope="module")
def server(tmp_path_factory) -> Iterator[str]:
    """JupyterLab on a free port of this machine, with a configuration of its own."""
    home = tmp_path_factory.mktemp("lab")
    work = home / "work"
    work.mkdir()
    cell = nbformat.v4.new_code_cell(SOURCE)
    kernel = {"name": "python3", "display_name": "Python 3", "language": "python"}
    notebook = nbformat.v4.new_notebook(cells=[cell], metadata={"kernelspec": kernel})
    nbformat.write(notebook, work / "brace.ipynb")
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
        page.locator(".tl-calc").first.wait_for(timeout=60_000)
        page.locator(".tl-calc mjx-container").first.wait_for(state="attached", timeout=60_000)
        yield page
        browser.close()


def test_headline_verdict_and_sketch_are_seen(page):
    headline = page.locator(".tl-headline").inner_text()
    assert "PASS, governed by bolt shear (9.3.2.1), utilisation 0.900" in headline
    assert page.locator(".tl-calc figure svg").is_visible()
    assert "net section" in page.locator(".tl-calc figure svg").inner_html()


def test_user_text_stays_literal(page):
    assert "brace <b>$x$" in page.locator(".tl-headline").inner_text()
    assert page.locator(".tl-headline mjx-container").count() == 0


def test_checks_table_is_open_and_right_aligned(page):
    table = page.locator(".tl-checks")
    assert table.is_visible()
    row = table.locator("tr", has_text="bolt shear")
    assert "277.9 kN" in row.inner_text()
    align = row.locator("td").nth(4).evaluate("cell => getComputedStyle(cell).textAlign")
    assert align == "right"


def test_parts_fold_by_mouse_and_by_keyboard(page):
    part = page.locator(".tl-calc details", has_text="Net section").first
    lines = part.locator(".tl-lines")
    assert not lines.is_visible()
    part.locator("summary").click()
    assert lines.is_visible()
    part.locator("summary").press("Enter")
    assert not lines.is_visible()
    part.locator("summary").press("Enter")
    assert lines.is_visible()


def test_mathematics_is_typeset_and_none_is_left_raw(page):
    page.evaluate("document.querySelectorAll('.tl-calc details').forEach(d => d.open = true)")
    page.wait_for_function(
        "document.querySelectorAll('.tl-calc .tl-maths').length > 0 &&"
        "[...document.querySelectorAll('.tl-calc .tl-maths')]"
        ".every(m => m.querySelector('mjx-container'))",
        timeout=30_000,
    )
    shown = page.locator(".tl-lines").all_inner_texts()
    assert shown
    assert not [text for text in shown if "$" in text or "\\frac" in text]


def test_nothing_came_from_outside_and_nothing_broke(page):
    assert page.outside == []
    assert page.errors == []


def test_no_line_runs_out_of_the_page(page):
    page.evaluate("document.querySelectorAll('.tl-calc details').forEach(d => d.open = true)")
    over = page.evaluate(
        "(() => { const c = document.querySelector('.tl-calc').getBoundingClientRect();"
        "return [...document.querySelectorAll('.tl-calc .tl-line, .tl-calc table, .tl-calc svg')]"
        ".filter(e => e.getBoundingClientRect().right > c.right + 1).length })()"
    )
    assert over == 0


def test_exported_html_stands_open_in_print(page, tmp_path):
    """nbconvert's own HTML: every part shows in print, where none can be unfolded."""
    from nbconvert.exporters import HTMLExporter

    from tensionlib.package.execute import execute

    cell = nbformat.v4.new_code_cell(SOURCE)
    kernel = {"name": "python3", "display_name": "Python 3", "language": "python"}
    notebook = nbformat.v4.new_notebook(cells=[cell], metadata={"kernelspec": kernel})
    html, _ = HTMLExporter().from_notebook_node(execute(notebook, Path(tmp_path), progress=False))
    file = tmp_path / "brace.html"
    file.write_text(html, encoding="utf-8")
    other = page.context.browser.new_page()
    # The exported page asks for its typesetter at an address this machine may not reach: the
    # LaTeX then stays readable as text.
    other.route("**/*", lambda r: r.continue_() if r.request.url.startswith("file:") else r.abort())
    other.goto(file.as_uri(), wait_until="domcontentloaded")
    other.emulate_media(media="print")
    lines = other.locator(".tl-calc .tl-line")
    assert lines.count() > 50
    assert lines.nth(10).is_visible()
    assert other.locator(".tl-text").first.is_hidden()
    other.close()
