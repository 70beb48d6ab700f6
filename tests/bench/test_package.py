"""The demo package to PDF against the browser PDF of the same notebook."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import nbformat
import playwright.async_api
import pytest
from nbconvert.exporters import WebPDFExporter

from lineproof.notebook.read import read_calc
from lineproof.package import build_package, to_pdf
from lineproof.resources import folder

DEMO = folder("calcs") / "floor-beam.ipynb"


@pytest.mark.benchmark(group="demo package to PDF")
def test_package_pdf_warm(benchmark: Callable[..., Any]) -> None:
    """The demo notebook, as stored, to the PDF of the package."""
    calc = read_calc(DEMO)

    def issue() -> bytes:
        return to_pdf(build_package([calc.record], [calc.walk]))

    issue()  # fonts and templates are read once
    assert benchmark(issue).startswith(b"%PDF")


@pytest.mark.benchmark(group="demo package to PDF")
def test_browser_pdf(
    benchmark: Callable[..., Any], chromium: str | None, monkeypatch: pytest.MonkeyPatch
) -> None:
    """The same notebook through nbconvert's own browser PDF."""
    launch = playwright.async_api.BrowserType.launch

    async def launch_installed(self: Any, **options: Any) -> Any:
        options["args"] = [*options.get("args", ()), "--no-sandbox", "--disable-gpu"]
        return await launch(self, executable_path=chromium, **options)

    monkeypatch.setattr(playwright.async_api.BrowserType, "launch", launch_installed)
    notebook = nbformat.read(DEMO, as_version=4)

    def export() -> bytes:
        content, _ = WebPDFExporter(allow_chromium_download=False).from_notebook_node(notebook)
        return bytes(content)

    assert benchmark.pedantic(export, rounds=3, warmup_rounds=1).startswith(b"%PDF")  # type: ignore[attr-defined]
