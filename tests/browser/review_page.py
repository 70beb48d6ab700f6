"""A package of two spans, and what tests read and do on its page in the browser."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING

from lineproof.audit.data import Severity
from lineproof.audit.review.data import Raised, Review, Reviewer
from lineproof.audit.review.print import printed_review
from lineproof.package import build_package, to_html
from lineproof.record import Record
from lineproof.sheet import Sheet

if TYPE_CHECKING:
    from playwright.sync_api import Locator, Page

AT = "2026-12-01T15:05:33Z"
MORI = Reviewer("Kei Mori", "KM")
Open = Callable[..., "Page"]


def beam(h: str = "600 mm", calc: str = "B1") -> Record:
    """Two spans alike, so that the second repeats the first; one check fails."""
    project = {
        "codes": {"pair": "NBC 2015 + A23.3-14"},
        "issue": {"prepared_by": "A. Verdon", "date": "2026-12-01"},
    }
    sheet = Sheet(calc, f"Beam {calc}", project=project)
    with sheet.part("data", "Data"):
        sheet.given("b", "400 mm", "width")
        sheet.given("h", h, "depth")
        sheet.given("A_s", "2000 mm2", "steel")
    for span in (1, 2):
        with sheet.part(f"span-{span}", f"Span {span}"):
            sheet.line("d = 0.9*h", unit="mm", title="Effective depth")
            sheet.line("a = 30*A_s/b", unit="mm", title="Block")
            sheet.check("a <= d", title="Block within the depth", key="within")
    with sheet.part("last", "Last"):
        sheet.line("r = h/b", unit="", title="Ratio of the sides")
        sheet.check("b >= h", title="Wider than deep", key="wide")
    return sheet.close()


ORDER = (
    "data/b", "data/h", "data/A_s", "span-1/d", "span-1/a", "span-1/within",
    "span-2/d", "span-2/a", "span-2/within", "last/r", "last/wide",
)  # fmt: skip


def with_finding() -> Review:
    found = Raised(4, Severity.MINOR, "Width?", "Kei Mori", AT, ("data/b",))
    return replace(Review("B1", reviewers=(MORI,)), findings=(found,))


def html_with(review: Review) -> str:
    record = beam()
    return to_html(build_package([record], reviews=[printed_review(review, record)]))


def row(page: Page, line: str) -> Locator:
    return page.locator(f"[id='{line}']")


def traces(page: Page) -> dict[str, str]:
    found: dict[str, str] = page.evaluate(
        "Object.fromEntries([...document.querySelectorAll('[data-trace]')]"
        ".map(e => [e.id, e.dataset.trace]))"
    )
    return found


def margins(page: Page) -> dict[str, str]:
    found: dict[str, str] = page.evaluate(
        "Object.fromEntries([...document.querySelectorAll('[data-mark]')]"
        ".map(e => [e.id, e.dataset.mark]))"
    )
    return found


def shown(page: Page) -> list[str]:
    return [line for line in ORDER if row(page, line).is_visible()]


def here(page: Page) -> str:
    return str(page.locator(".rv-here").get_attribute("id"))


def status(page: Page) -> str:
    return page.get_by_role("status").inner_text()


def saved(page: Page) -> str:
    with page.expect_download() as caught:
        page.get_by_role("button", name="Save to file").click()
    return Path(caught.value.path()).read_text(encoding="utf-8")


def bring(page: Page, text: str, name: str = "their.review.json") -> None:
    page.get_by_label("Bring in a file").set_input_files(
        {"name": name, "mimeType": "application/json", "buffer": text.encode()}
    )
    page.get_by_role("status").get_by_text(name).wait_for()
