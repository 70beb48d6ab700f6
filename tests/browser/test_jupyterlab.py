"""A real JupyterLab server and a real browser, with the notebook untrusted as it arrives."""

from __future__ import annotations

import json
import os
import re
import socket
import subprocess
import sys
import time
from collections.abc import Iterator
from dataclasses import dataclass
from http.client import HTTPConnection
from pathlib import Path
from typing import TYPE_CHECKING, Any

import pytest

from lineproof.notebook.read import read_calc
from lineproof.package import records_in_html, records_in_pdf

if TYPE_CHECKING:
    from playwright.sync_api import Browser, Page

TOKEN = "a-token-for-this-test"  # noqa: S105 - the server lives as long as the tests
START_SECONDS = 60
PAGE_MILLISECONDS = 60_000


@dataclass(frozen=True)
class Lab:
    """A running server that serves one folder with the beam's notebook."""

    port: int
    folder: Path

    def get(self, path: str) -> tuple[int, str, bytes]:
        """Return status, content type and body."""
        connection = HTTPConnection("127.0.0.1", self.port, timeout=60)
        try:
            connection.request("GET", f"/{path}", headers={"Authorization": f"token {TOKEN}"})
            answer = connection.getresponse()
            return answer.status, answer.headers["Content-Type"], answer.read()
        finally:
            connection.close()


@pytest.fixture(scope="module")
def lab(beam_text: str, tmp_path_factory: pytest.TempPathFactory) -> Iterator[Lab]:
    """Start a JupyterLab of this environment with fresh settings, so that nothing is trusted."""
    home = tmp_path_factory.mktemp("lab")
    folder = home / "calcs"
    folder.mkdir()
    (folder / "beam.ipynb").write_text(beam_text, encoding="utf-8")
    settings = {
        name: str(home / name.lower())
        for name in ("JUPYTER_CONFIG_DIR", "JUPYTER_DATA_DIR", "JUPYTER_RUNTIME_DIR", "IPYTHONDIR")
    }
    port = _free_port()
    command = [
        sys.executable, "-m", "jupyterlab", "--no-browser", "--allow-root",
        f"--ServerApp.port={port}", "--ServerApp.port_retries=0",
        "--LabApp.expose_app_in_browser=True",
        f"--IdentityProvider.token={TOKEN}", f"--ServerApp.root_dir={folder}",
    ]  # fmt: skip
    log = home / "server.log"
    with log.open("wb") as output:
        server = subprocess.Popen(
            command, env=os.environ | settings, stdout=output, stderr=subprocess.STDOUT
        )
    try:
        made = Lab(port, folder)
        _wait(made, server, log)
        yield made
    finally:
        server.terminate()
        server.wait(timeout=30)


def _free_port() -> int:
    with socket.socket() as taken:
        taken.bind(("127.0.0.1", 0))
        port: int = taken.getsockname()[1]
        return port


def _wait(lab: Lab, server: subprocess.Popen[bytes], log: Path) -> None:
    end = time.monotonic() + START_SECONDS
    while time.monotonic() < end and server.poll() is None:
        try:
            lab.get("api")
        except OSError:
            time.sleep(0.2)
        else:
            return
    pytest.fail(f"JupyterLab did not start:\n{log.read_text(errors='replace')[-2000:]}")


def test_the_server_lists_both_exporters(lab: Lab) -> None:
    # JupyterLab's "Save and Export Notebook As" menu is filled from this list.
    listed = json.loads(lab.get("api/nbconvert")[2])
    assert listed["calc_package_pdf"] == {"output_mimetype": "application/pdf"}
    assert listed["calc_package_html"] == {"output_mimetype": "text/html"}


def test_the_menu_route_downloads_the_pdf(lab: Lab) -> None:
    status, kind, body = lab.get("nbconvert/calc_package_pdf/beam.ipynb?download=true")
    assert status == 200
    assert kind.startswith("application/pdf")
    assert body.startswith(b"%PDF-")
    assert records_in_pdf(body)[0]["calc"]["id"] == "B1"


def test_the_menu_route_downloads_the_page(lab: Lab) -> None:
    status, kind, body = lab.get("nbconvert/calc_package_html/beam.ipynb?download=true")
    assert status == 200
    assert kind.startswith("text/html")
    assert records_in_html(body.decode())[0]["calc"]["id"] == "B1"


def test_a_calc_that_was_not_run_is_refused_with_what_to_do(
    lab: Lab, unrun: dict[str, Any]
) -> None:
    (lab.folder / "unrun.ipynb").write_text(json.dumps(unrun), encoding="utf-8")
    status, _, body = lab.get("nbconvert/calc_package_pdf/unrun.ipynb?download=true")
    assert status == 500
    assert "unrun: has not been run; run all cells, then save" in body.decode()


@pytest.fixture(scope="module")
def page(lab: Lab, browser: Browser) -> Iterator[Page]:
    """Open the beam's notebook untrusted and wait until it is typeset."""
    made = browser.new_page(viewport={"width": 1400, "height": 2200})
    made.goto(
        f"http://127.0.0.1:{lab.port}/lab/tree/beam.ipynb?token={TOKEN}", timeout=PAGE_MILLISECONDS
    )
    made.wait_for_function(
        "document.querySelectorAll('.jp-OutputArea mjx-container').length >= 14",
        timeout=PAGE_MILLISECONDS,
    )
    yield made
    made.close()


def formulas(page: Page) -> list[str]:
    """Return the typeset formulas as the MathML that MathJax keeps for readers."""
    found: list[str] = page.evaluate(
        "Array.from(document.querySelectorAll('.jp-OutputArea mjx-assistive-mml'), e =>"
        " e.innerHTML)"
    )
    return found


def words(mathml: str) -> str:
    return re.sub(r"\s+", "", re.sub(r"<[^>]+>", "", mathml)).replace("\u2009", "")


def test_the_notebook_is_untrusted(page: Page) -> None:
    trusted = page.evaluate(
        "Array.from(document.querySelectorAll('.jp-StatusBar-Widget [title]'), e => e.title)"
    )
    assert any("not trusted" in str(title).lower() for title in trusted)


def test_untrusted_formulas_are_typeset_with_their_numbers(page: Page) -> None:
    # By hand: a = 26.82 mm; M_r = 850000 x (550 - 26.82/2) = 456.1e6 N.mm.
    shown = [words(formula) for formula in formulas(page)]
    assert "a=26.8mm" in shown
    assert "Mr=456kN⋅m" in [text.replace("·", "⋅") for text in shown]


def test_a_fraction_is_a_fraction(page: Page) -> None:
    halves = [f for f in formulas(page) if re.search(r"<mfrac>\s*<mi>a</mi>\s*<mn>2</mn>", f)]
    assert len(halves) == 1
    assert "a2" not in page.inner_text(".jp-OutputArea")


def test_no_formula_failed_to_typeset(page: Page) -> None:
    assert page.evaluate("document.querySelectorAll('mjx-merror').length") == 0
    texts = page.locator(".jp-OutputArea").all_inner_texts()
    assert not any("\\(" in text or "displaystyle" in text for text in texts)


def test_titles_clauses_and_verdicts_stand_beside_the_formulas(page: Page) -> None:
    text = "\n".join(page.locator(".jp-OutputArea").all_inner_texts())
    assert "2 Flexure at midspan" in text
    assert "Source: drawing S-201." in text
    assert re.search(r"holds\s+ratio 0\.84(?!\d)", text)  # by hand: 385/456.1


def test_nothing_is_cut_off_or_laid_over_its_neighbour(page: Page) -> None:
    wider = page.evaluate(
        """Array.from(document.querySelectorAll('.jp-OutputArea td'))
             .filter(cell => cell.scrollWidth > cell.clientWidth + 1).length"""
    )
    assert wider == 0


def test_a_calc_run_and_saved_in_jupyterlab_can_be_exported(
    lab: Lab, browser: Browser, unrun: dict[str, Any]
) -> None:
    path = lab.folder / "worked.ipynb"
    unrun["metadata"]["kernelspec"] = {"name": "python3", "display_name": "Python 3"}
    path.write_text(json.dumps(unrun), encoding="utf-8")
    made = browser.new_page(viewport={"width": 1400, "height": 2200})
    try:
        place = "lab/workspaces/worked/tree/worked.ipynb"  # without the notebooks opened before
        made.goto(f"http://127.0.0.1:{lab.port}/{place}?token={TOKEN}", timeout=PAGE_MILLISECONDS)
        # Only the status bar tells a kernel that is ready; the notebook's own mark is idle before.
        made.wait_for_selector("text=| Idle", timeout=PAGE_MILLISECONDS)
        made.evaluate("void window.jupyterapp.commands.execute('notebook:run-all-cells')")
        made.wait_for_selector("text=record of B1", timeout=PAGE_MILLISECONDS)
        made.evaluate("window.jupyterapp.commands.execute('docmanager:save').then(() => true)")
    finally:
        made.close()
    calc = read_calc(path)
    assert calc.record.entries["flexure/M_r"]["printed"]["result"] == "456"
    status, _, body = lab.get("nbconvert/calc_package_pdf/worked.ipynb?download=true")
    assert (status, body[:5]) == (200, b"%PDF-")
