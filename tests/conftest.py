"""Shared by all tests: a browser, and a small calc notebook that lineproof can run and print."""

from __future__ import annotations

import copy
import json
import os
import shutil
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path
from typing import TYPE_CHECKING, Any

import pytest

from lineproof.notebook.execute import execute

if TYPE_CHECKING:
    from playwright.sync_api import Browser

CHROMIUM_NAMES = ("chromium", "chromium-browser", "google-chrome", "google-chrome-stable")
CHROMIUM_ARGUMENTS = [
    "--no-sandbox",
    "--disable-gpu",
    "--disable-quic",
    "--no-first-run",
    "--disable-background-networking",
    "--disable-component-update",
    "--disable-sync",
]

Notebook = dict[str, Any]


@pytest.fixture(scope="session")
def chromium() -> str | None:
    """The path of a Chromium; None stands for the one that Playwright has installed itself.

    Looks at the environment variable CHROMIUM, then at the system's, then asks Playwright.
    """
    given = os.environ.get("CHROMIUM")
    if given:
        if not Path(given).is_file():
            pytest.fail(f"CHROMIUM={given}: no such file")
        return given
    found = next(filter(None, map(shutil.which, CHROMIUM_NAMES)), None)
    if found is None:
        command = [sys.executable, "-m", "playwright", "install", "chromium"]
        done = subprocess.run(command, capture_output=True, text=True, check=False)
        if done.returncode:
            pytest.fail(
                "no Chromium for the browser tests: install the system's package 'chromium', or "
                f"set CHROMIUM to its path ({done.stderr.strip()[-200:]})"
            )
    return found


@pytest.fixture(scope="session")
def browser(chromium: str | None) -> Iterator[Browser]:
    """A headless Chromium, driven by Playwright."""
    from playwright.sync_api import sync_playwright  # noqa: PLC0415 - browser tests only

    with sync_playwright() as playwright:
        made = playwright.chromium.launch(executable_path=chromium, args=CHROMIUM_ARGUMENTS)
        yield made
        made.close()


INPUTS = 'M_f = "385 kN.m"   # factored moment\nA_s = "2500 mm2"   # tension steel'

GIVENS = """\
sheet = Sheet("B1", "Test beam B1")
with sheet.part("data", "Data"):
    sheet.given("b", "1900 mm", "effective width of flange")
    sheet.given("d", "550 mm", "depth to the steel")
    sheet.given("f_c", "32 MPa", "concrete strength")
    sheet.given("f_y", "400 MPa", "yield strength", source="drawing S-201")
    sheet.given("phi_c", "0.65", "resistance factor for concrete")
    sheet.given("phi_s", "0.85", "resistance factor for steel")
    sheet.given("alpha_1", "0.802", "stress block factor")
    sheet.given("M_f", M_f, "factored moment")
    sheet.given("A_s", A_s, "tension steel")
"""

FLEXURE = """\
with sheet.part("flexure", "Flexure at midspan"):
    sheet.line("a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)", unit="mm", title="Depth of the block")
    sheet.line("M_r = phi_s*A_s*f_y*(d - a/2)", unit="kN.m", title="Moment resistance")
    sheet.check("M_f <= M_r", title="Moment resistance", key="moment")
"""


def _cell(kind: str, place: str, source: str, *tags: str) -> dict[str, Any]:
    made: dict[str, Any] = {
        "cell_type": kind,
        "id": place,
        "metadata": {"tags": list(tags)} if tags else {},
        "source": source,
    }
    return made | ({"outputs": [], "execution_count": None} if kind == "code" else {})


@pytest.fixture(scope="session")
def _unrun() -> Notebook:
    """A beam, by hand: a = 0.85 x 2500 x 400/(0.802 x 0.65 x 32 x 1900) = 26.82 mm.

    M_r = 850000 x (550 - 26.82/2) = 456.1e6 N.mm.
    """
    return {
        "cells": [
            _cell("markdown", "title", "# Beam B1\n\nA beam for tests."),
            _cell("code", "imports", "from lineproof import Sheet"),
            _cell("code", "inputs", INPUTS, "parameters"),
            _cell("code", "givens", GIVENS),
            _cell("markdown", "prose", "The block is {{ a }} deep, the resistance {{ M_r }}."),
            _cell("code", "working", FLEXURE),
            _cell("code", "close", "sheet.close()", "nbval-ignore-output"),
        ],
        "metadata": {},
        "nbformat": 4,
        "nbformat_minor": 5,
    }


@pytest.fixture(scope="session")
def beam_text(_unrun: Notebook, tmp_path_factory: pytest.TempPathFactory) -> str:
    """The text of the beam's notebook, executed."""
    return execute(_unrun, "beam.ipynb", tmp_path_factory.mktemp("run"))


@pytest.fixture
def unrun(_unrun: Notebook) -> Notebook:
    """The beam's notebook, never run; a copy to change at will."""
    return copy.deepcopy(_unrun)


@pytest.fixture
def beam(beam_text: str) -> Notebook:
    """The beam's notebook, executed; a copy to change at will."""
    made: Notebook = json.loads(beam_text)
    return made


@pytest.fixture
def beam_file(beam_text: str, tmp_path: Path) -> Path:
    """The beam's executed notebook in a folder of its own."""
    path = tmp_path / "beam.ipynb"
    path.write_text(beam_text, encoding="utf-8")
    return path
