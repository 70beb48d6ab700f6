"""The review page of the longest demo: opened, stepped through by key, filtered."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path
from time import perf_counter
from typing import TYPE_CHECKING, Any

import pytest

from lineproof.notebook.read import read_calc
from lineproof.package import build_package, to_html
from lineproof.resources import folder

if TYPE_CHECKING:
    from playwright.sync_api import Browser

STEPS = 200
MOST_SECONDS = 30.0
"""For all steps, painted one by one, on a busy machine without a GPU."""


@pytest.mark.benchmark(group="review page")
def test_stepping_two_hundred_lines(
    benchmark: Callable[..., Any], browser: Browser, tmp_path: Path
) -> None:
    """1,865 entries: each step lights, scrolls and paints before the next key."""
    calc = read_calc(folder("calcs") / "floor-beam.ipynb")
    path = tmp_path / "floor-beam.html"
    path.write_text(to_html(build_package([calc.record], [calc.walk])), encoding="utf-8")
    page = browser.new_page(viewport={"width": 1400, "height": 900})
    page.goto(path.as_uri())
    page.get_by_role("button", name="Review", exact=True).click()
    page.keyboard.press("Escape")

    def walk() -> float:
        start = perf_counter()
        for _ in range(STEPS):
            page.keyboard.press("n")
        return perf_counter() - start

    taken: float = benchmark.pedantic(walk, rounds=2, iterations=1)  # type: ignore[attr-defined]
    assert taken < MOST_SECONDS
    page.close()


@pytest.mark.benchmark(group="review page")
def test_filtering_and_showing_all_again(
    benchmark: Callable[..., Any], browser: Browser, tmp_path: Path
) -> None:
    """Checks only, then all lines, each painted."""
    calc = read_calc(folder("calcs") / "floor-beam.ipynb")
    path = tmp_path / "floor-beam.html"
    path.write_text(to_html(build_package([calc.record], [calc.walk])), encoding="utf-8")
    page = browser.new_page(viewport={"width": 1400, "height": 900})
    page.goto(path.as_uri())
    page.get_by_role("button", name="Review", exact=True).click()
    page.keyboard.press("Escape")

    def both() -> None:
        for key in ("2", "1"):
            page.keyboard.press(key)
            page.evaluate("new Promise(done => requestAnimationFrame(done))")

    benchmark.pedantic(both, rounds=3, iterations=1)  # type: ignore[attr-defined]
    assert page.locator(".rv-some").count() == 0
    page.close()
