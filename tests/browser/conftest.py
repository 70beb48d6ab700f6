"""A browser window, and a package opened in it for review."""

from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path
from typing import TYPE_CHECKING

import pytest

from lineproof.package import build_package, to_html

from .review_page import (
    Open,
    beam,
)

if TYPE_CHECKING:
    from playwright.sync_api import Browser, BrowserContext, Page


@pytest.fixture
def context(browser: Browser) -> Iterator[BrowserContext]:
    made = browser.new_context(viewport={"width": 1400, "height": 900}, offline=True)
    yield made
    made.close()


@pytest.fixture
def shown(context: BrowserContext, tmp_path: Path) -> Iterator[Open]:
    """Open a package as a file, the tools closed; whatever the page complains of is a fault."""
    said: list[str] = []

    def show_page(html: str | None = None, name: str = "beam.html") -> Page:
        path = tmp_path / name
        path.write_text(html or to_html(build_package([beam()])), encoding="utf-8")
        page = context.new_page()
        page.on("console", lambda message: said.append(message.text))
        page.on("pageerror", lambda error: said.append(str(error)))
        page.goto(path.as_uri())
        return page

    yield show_page
    assert said == []


@pytest.fixture
def opened(shown: Open) -> Open:
    """Open a package as a file, with the tools open and the reviewer named."""

    def open_page(html: str | None = None, name: str = "beam.html", who: str = "Kei Mori") -> Page:
        page = shown(html, name)
        page.get_by_role("button", name="Review", exact=True).click()
        if who:
            page.get_by_label("Your name").fill(who)
            page.get_by_label("Initials").fill("KM")
        return page

    return open_page
