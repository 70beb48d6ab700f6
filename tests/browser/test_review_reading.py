"""The page under review on paper, on a narrow screen, by key alone and in high contrast."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Any

import pytest

from lineproof.notebook.read import read_calc
from lineproof.package import build_package, to_html
from lineproof.resources import folder

from ..package.whole_beam import whole_beam  # noqa: TID252 - one beam for all packages
from .review_page import (
    ORDER,
    Open,
    beam,
    here,
    margins,
    row,
    shown,
)

if TYPE_CHECKING:
    from playwright.sync_api import Browser


def test_on_paper_nothing_of_the_tools_is_seen(opened: Open) -> None:
    page = opened()
    row(page, "span-1/d").locator(".result").click()
    page.keyboard.press("a")
    page.keyboard.press("2")
    page.emulate_media(media="print")
    assert not page.locator("#rv").is_visible()
    assert shown(page) == list(ORDER)
    style = page.evaluate(
        "(() => { const e = document.getElementById('span-1/d'); const s = getComputedStyle(e);"
        " return [s.backgroundColor, s.boxShadow, s.marginLeft,"
        " getComputedStyle(e, '::before').content, getComputedStyle(e, '::after').content]; })()"
    )
    assert style == ["rgba(0, 0, 0, 0)", "none", "0px", "none", "none"]


def test_every_control_has_a_name_and_every_group_too(opened: Open) -> None:
    page = opened()
    row(page, "span-1/d").locator(".result").click()
    unnamed: list[Any] = page.evaluate(
        "[...document.querySelectorAll('#rv button, #rv input, #rv textarea, #rv select')].filter("
        "e => !(e.textContent.trim() || e.getAttribute('aria-label') || e.labels?.length))"
        ".map(e => e.outerHTML)"
    )
    assert unnamed == []
    groups = page.locator("#rv [role=group]").all()
    named = [g.get_attribute("aria-label") or g.get_attribute("aria-labelledby") for g in groups]
    assert len(named) == 5
    assert all(named)
    assert page.get_by_role("status").get_attribute("aria-live") == "polite"


def test_the_tools_can_be_used_without_a_mouse(opened: Open) -> None:
    """From the button on: opened, named, a line chosen and marked."""
    page = opened(who="")
    assert page.evaluate("document.activeElement.dataset.rv") == "name"
    page.keyboard.type("Kei Mori")
    page.keyboard.press("Tab")
    page.keyboard.type("KM")
    page.keyboard.press("Tab")
    assert page.evaluate("document.activeElement.textContent") == "Previous"
    page.keyboard.press("Tab")
    page.keyboard.press("Enter")
    assert here(page) == "data/b"
    page.keyboard.press("a")
    assert margins(page) == {"data/b": "✓ accepted"}


def test_the_tools_come_first_by_tab_and_by_a_key_from_any_line(shown: Open) -> None:
    """Behind the thousands of links of a long package nobody would reach them."""
    page = shown()
    page.keyboard.press("Tab")
    assert page.evaluate("document.activeElement.textContent") == "Review"
    page.keyboard.press("Enter")
    page.keyboard.press("Escape")
    page.keyboard.press("n")
    assert page.evaluate("document.activeElement.id") == here(page) == "data/b"
    page.keyboard.press("t")
    assert page.evaluate("document.activeElement.getAttribute('aria-label')") == "Review tools"
    page.keyboard.press("Tab")
    assert page.evaluate("document.activeElement.textContent") == "Close"
    page.keyboard.press("Escape")
    assert page.evaluate("document.activeElement.id") == "data/b"


def test_a_filter_that_hides_the_line_in_hand_takes_the_focus_to_the_tools(opened: Open) -> None:
    """Else it is nowhere, and who listens to the page is sent to its beginning."""
    page = opened()
    page.keyboard.press("Escape")
    page.keyboard.press("n")
    page.keyboard.press("2")
    page.wait_for_timeout(100)
    assert page.evaluate("document.activeElement.id") == "rv"
    page.keyboard.press("n")
    assert page.evaluate("document.activeElement.id") == here(page) == "span-1/within"


@pytest.mark.parametrize("width", [1400, 1000, 400])
def test_the_page_is_never_wider_than_the_window(opened: Open, width: int) -> None:
    page = opened()
    page.set_viewport_size({"width": width, "height": 800})
    row(page, "span-1/d").locator(".result").click()
    page.keyboard.press("a")
    assert page.evaluate("document.documentElement.scrollWidth <= window.innerWidth")


def test_a_drawing_keeps_the_size_of_its_texts_on_a_narrow_screen(shown: Open) -> None:
    """The elevation is 178 mm wide, at 96 points an inch 673: moved sideways, not made smaller."""
    page = shown(to_html(build_package([whole_beam().close().data])))
    page.set_viewport_size({"width": 390, "height": 800})
    box = page.locator("figure svg").first.bounding_box()
    assert box is not None
    assert box["width"] > 600
    assert page.evaluate("document.documentElement.scrollWidth <= window.innerWidth")


def test_the_line_in_hand_is_seen_beside_the_tools_on_a_narrow_screen(opened: Open) -> None:
    page = opened()
    page.set_viewport_size({"width": 400, "height": 800})
    page.keyboard.press("Escape")
    for _ in range(9):
        page.keyboard.press("n")
        box, tools = page.locator(".rv-here").bounding_box(), page.locator("#rv").bounding_box()
        assert box is not None
        assert tools is not None
        assert box["y"] >= 0
        assert box["y"] + box["height"] <= tools["y"] + 1


def test_a_long_package_is_stepped_through_by_key(opened: Open) -> None:
    """The demo of 1,865 entries: the two hundredth line from the first is where it should be."""
    calc = read_calc(folder("calcs") / "floor-beam.ipynb")
    page = opened(to_html(build_package([calc.record], [calc.walk])))
    entries = [
        entry["id"]
        for part in calc.record.parts
        for entry in part["entries"]
        if entry["kind"] not in ("figure", "table")
    ]
    assert sum(len(part["entries"]) for part in calc.record.parts) > 1000
    page.keyboard.press("Escape")
    page.keyboard.press("n")
    start = entries.index(here(page))
    for _ in range(199):
        page.keyboard.press("n")
    assert here(page) == entries[start + 199]
    box = page.locator(".rv-here").bounding_box()
    assert box is not None
    assert 0 <= box["y"] <= 900


def test_high_contrast_shows_what_is_pressed(browser: Browser, tmp_path: Path) -> None:
    """The system's colours replace ours; a pressed button must still differ from the others."""
    path = tmp_path / "beam.html"
    path.write_text(to_html(build_package([beam()])), encoding="utf-8")
    page = browser.new_page(forced_colors="active")
    page.goto(path.as_uri())
    page.get_by_role("button", name="Review", exact=True).click()
    colours = page.evaluate(
        "[...document.querySelectorAll('[data-do^=args]')].map(e =>"
        " [e.getAttribute('aria-pressed'), getComputedStyle(e).backgroundColor])"
    )
    page.close()
    pressed = {colour for truth, colour in colours if truth == "true"}
    others = {colour for truth, colour in colours if truth == "false"}
    assert len(pressed) == len(others) == 1
    assert pressed != others
