"""The demo package as its readers open it: the HTML page offline in Chromium, and the PDF."""

from __future__ import annotations

import io
from collections.abc import Iterator
from pathlib import Path
from typing import TYPE_CHECKING, Any

import pypdf
import pytest

from lineproof.notebook.read import read_calc
from lineproof.package import build_package, records_in_pdf, to_html, to_pdf
from lineproof.record import Record
from lineproof.resources import folder

if TYPE_CHECKING:
    from playwright.sync_api import Browser, Page

DEMO = folder("calcs") / "floor-beam.ipynb"


@pytest.fixture(scope="module")
def demo() -> Any:
    """The stored demo calc."""
    return read_calc(DEMO)


@pytest.fixture(scope="module")
def opened(
    demo: Any, browser: Browser, tmp_path_factory: pytest.TempPathFactory
) -> Iterator[tuple[Page, list[str], list[str]]]:
    """The page opened from a file with no network; what it asked for, and what it complained of."""
    path = tmp_path_factory.mktemp("page") / "floor-beam.html"
    path.write_text(to_html(build_package([demo.record], [demo.walk])), encoding="utf-8")
    context = browser.new_context(viewport={"width": 1200, "height": 1600}, offline=True)
    page = context.new_page()
    asked: list[str] = []
    said: list[str] = []
    page.on("request", lambda request: asked.append(request.url))
    page.on("console", lambda message: said.append(message.text))
    page.on("pageerror", lambda error: said.append(str(error)))
    page.goto(path.as_uri())
    page.evaluate("document.fonts.ready.then(() => true)")
    yield page, asked, said
    context.close()


def test_the_page_asks_for_nothing_but_itself(
    opened: tuple[Page, list[str], list[str]],
) -> None:
    """Fonts and figures are in the file; nothing is written to the console."""
    _, asked, said = opened

    assert [url for url in asked if not url.startswith(("file:", "data:"))] == []
    assert said == []


def test_formulas_are_laid_out_as_mathematics(opened: tuple[Page, list[str], list[str]]) -> None:
    """In the fraction of the stress block, one part stands over the other."""
    page, _, _ = opened
    row = page.locator("[id='sag-1/a']")
    above, below = row.locator("mfrac").first.locator(":scope > *").all()
    top, bottom = above.bounding_box(), below.bounding_box()

    assert top is not None
    assert bottom is not None
    assert top["y"] + top["height"] <= bottom["y"] + 1
    assert page.evaluate("document.documentElement.scrollWidth <= window.innerWidth")


# Words of a table that stand on more than one line: "Mark" as "Mar" and "k", "20M" as "20" and "M".
BROKEN_WORDS = """() => {
    const range = document.createRange(), broken = [];
    for (const cell of document.querySelectorAll(".table-frame th, .table-frame td")) {
        const texts = document.createTreeWalker(cell, NodeFilter.SHOW_TEXT);
        while (texts.nextNode()) for (const word of texts.currentNode.data.matchAll(/[\\w.]+/g)) {
            range.setStart(texts.currentNode, word.index);
            range.setEnd(texts.currentNode, word.index + word[0].length);
            const tops = [...range.getClientRects()].map((box) => Math.round(box.top));
            if (new Set(tops).size > 1) broken.push(word[0]);
        }
    }
    return broken;
}"""


def test_words_of_a_table_keep_room_on_a_narrow_screen(browser: Browser, tmp_path: Path) -> None:
    """What would cure the failing checks stood one word a line, on 390 px, over many screens."""
    existing = read_calc(folder("calcs") / "existing-beam.ipynb")
    path = tmp_path / "existing-beam.html"
    path.write_text(to_html(build_package([existing.record], [existing.walk])), encoding="utf-8")
    context = browser.new_context(viewport={"width": 390, "height": 1000}, offline=True)
    page = context.new_page()
    page.goto(path.as_uri())
    heads = page.locator("th", has_text="What would cure it")
    assert heads.count() == 1
    heads_text = heads.inner_text()
    box, letter = (
        heads.bounding_box(),
        heads.evaluate("e => parseFloat(getComputedStyle(e).fontSize)"),
    )
    rest = page.locator("th.rest").all_inner_texts()
    context.close()
    assert rest == [heads_text]  # none of the narrow columns, such as a ratio beside FAILS
    assert box is not None
    assert box["width"] >= 16 * letter


@pytest.mark.parametrize("width", [1400, 900, 390])
def test_no_word_of_a_table_is_parted(
    opened: tuple[Page, list[str], list[str]], width: int
) -> None:
    """On a narrow screen a table is moved sideways in its frame; the page itself stays put."""
    page, _, _ = opened
    before = page.viewport_size
    assert before is not None
    page.set_viewport_size({"width": width, "height": 1000})

    assert page.evaluate(BROKEN_WORDS) == []
    assert page.evaluate("document.documentElement.scrollWidth <= window.innerWidth")
    page.set_viewport_size(before)


def test_an_argument_leads_to_the_line_it_comes_from(
    demo: Any,
    opened: tuple[Page, list[str], list[str]],
) -> None:
    """From M_r to the effective depth."""
    page, _, _ = opened
    label = demo.record.entries["sag-1/d"]["label"]
    page.locator("[id='sag-1/M_r'] a", has_text=label).first.click()

    assert page.evaluate("decodeURIComponent(location.hash)") == "#sag-1/d"


def test_the_pdf_is_that_of_the_record(demo: Any) -> None:
    """Tagged, with the record inside, every clause in its text, and the same bytes again."""
    package = build_package([demo.record], [demo.walk])
    content = to_pdf(package)
    reader = pypdf.PdfReader(io.BytesIO(content))
    catalog: Any = reader.trailer["/Root"]
    text = " ".join(" ".join(page.extract_text() for page in reader.pages).split())
    clauses = {entry["clause"] for entry in demo.record.entries.values() if entry["clause"]}

    assert to_pdf(build_package([demo.record], [demo.walk])) == content
    assert catalog["/MarkInfo"]["/Marked"]
    assert "/StructTreeRoot" in catalog
    assert [Record.from_data(data).data for data in records_in_pdf(content)] == [demo.record.data]
    assert {clause for clause in clauses if clause not in text} == set()


def test_the_demo_says_what_it_is(demo: Any) -> None:
    """Preliminary until its values are confirmed, every check holding, what is not in it named."""
    status = demo.record.data["status"]

    assert status["scope"] == "preliminary: values from memory not yet confirmed"
    assert "Vibration of the floor" in {row["check"] for row in status["not_covered"]}
    assert status["failed"] == []
