"""Figures where our font is missing, as under the cells of a notebook."""

from __future__ import annotations

from typing import TYPE_CHECKING

import pytest

from lineproof.drawing import Figure, Text, svg, words
from lineproof.drawing.metrics import text_width

if TYPE_CHECKING:
    from playwright.sync_api import Browser

LABEL = words("T02 2-20M × 2430 in flange")
SIZE = 2.5  # mm


@pytest.mark.parametrize("rotation", [0.0, 90.0])
def test_a_text_in_any_font_is_as_wide_as_it_was_measured(
    browser: Browser, rotation: float
) -> None:
    """Monospaced letters are about half as wide again; drawn to the measure they stay inside."""
    text = Text((0.0, 0.0), LABEL, size=SIZE, rotation=rotation)
    figure = Figure(100.0, 100.0, 1.0, (20.0, 20.0), (text,), "A label.")
    page = browser.new_page()
    page.set_content(svg(figure, any_font=True).replace("Libertinus Serif,", "monospace,"))
    long = page.evaluate("document.querySelector('text').getComputedTextLength()")
    drawn = page.evaluate("""() => {
        const {left, right, top, bottom} = document.querySelector('text').getBoundingClientRect();
        return Math.max(right - left, bottom - top) * 25.4 / 96;
    }""")
    page.close()

    width = text_width(LABEL, SIZE)
    assert drawn == pytest.approx(width, abs=0.6)  # half a letter of 2.5 mm
    assert long == pytest.approx(width, abs=0.6)
