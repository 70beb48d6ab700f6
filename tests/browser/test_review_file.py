"""The file of a review in the HTML package: saved, brought in, stale, kept by the browser."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

import pytest

from lineproof.audit.review.data import Review, Reviewer, State
from lineproof.audit.review.marks import marked, stale_marks, standing
from lineproof.audit.review.read import read_review
from lineproof.package import build_package, to_html

from .review_page import (
    AT,
    MORI,
    ORDER,
    Open,
    beam,
    bring,
    html_with,
    margins,
    row,
    saved,
    shown,
    status,
    with_finding,
)

if TYPE_CHECKING:
    from playwright.sync_api import BrowserContext


def test_what_is_saved_is_what_the_command_reads_and_writes(opened: Open) -> None:
    page = opened()
    page.keyboard.press("Escape")
    for _ in ORDER:
        page.keyboard.press("n")
        page.keyboard.press("a")
    text = saved(page)
    review = read_review(text)
    assert review.to_text() == text
    stands = standing(review, beam())
    assert (set(stands.accepted), stands.open_items) == (set(ORDER), ())
    assert stale_marks(review, beam()) == ()
    assert review.reviewers == (MORI,)


def test_the_file_is_named_after_the_page(opened: Open) -> None:
    page = opened(name="floor beam.html")
    row(page, "last/r").locator(".result").click()
    page.keyboard.press("a")
    with page.expect_download() as caught:
        page.get_by_role("button", name="Save to file").click()
    assert caught.value.suggested_filename == "floor beam.review.json"


def test_a_file_is_brought_in_and_nothing_here_is_lost(opened: Open) -> None:
    record = beam()
    theirs = marked(
        Review("B1", reviewers=(Reviewer("Ines Ott", "IO"),)), record, ["last/r", "last/wide"],
        by="Ines Ott", at=AT, state=State.QUERIED, note="<img src=x onerror=alert(1)>",
    )  # fmt: skip
    page = opened()
    row(page, "last/r").locator(".result").click()
    page.keyboard.press("a")
    bring(page, theirs.to_text())
    assert "1 line in conflict" in status(page)
    assert margins(page) == {"last/r": "≠ conflict", "last/wide": "? query"}
    told = page.locator("[data-rv=marks] li").all_inner_texts()
    assert any("<img src=x onerror=alert(1)>" in each for each in told)
    assert page.locator("#rv img").count() == 0
    assert {mark.by for mark in read_review(saved(page)).marks} == {"Kei Mori", "Ines Ott"}


def test_stale_marks_are_shown_with_their_cause(opened: Open) -> None:
    older = beam(h="500 mm")
    review = marked(Review("B1", reviewers=(MORI,)), older, ORDER, by="Kei Mori", at=AT)
    page = opened()
    bring(page, review.to_text())
    changed = {"data/h", "span-1/d", "span-1/within", "span-2/d", "span-2/within", "last/r",
               "last/wide"}  # fmt: skip
    assert {line for line, mark in margins(page).items() if mark == "stale"} == changed
    assert "7 lines have changed since marked" in status(page)
    row(page, "span-1/within").locator(".result").click()
    told = page.locator("[data-rv=marks] li").inner_text()
    assert told.endswith("arithmetic checked; stale: 1.2 Depth was 500 mm, is 600 mm")
    page.keyboard.press("7")
    assert set(shown(page)) == changed


def test_a_query_on_a_line_changed_since_is_stale_as_well(opened: Open) -> None:
    """Block a does not rest on h: its query stands; that of the depth d asks of another depth."""
    older, ott = beam(h="500 mm"), Reviewer("Ines Ott", "IO")
    review = marked(Review("B1", reviewers=(ott,)), older, ["span-1/d", "span-1/a"],
                    by="Ines Ott", at=AT, state=State.QUERIED)  # fmt: skip
    page = opened()
    bring(page, review.to_text())
    page.keyboard.press("Escape")
    page.keyboard.press("7")
    assert shown(page) == ["span-1/d"]
    page.keyboard.press("6")
    assert shown(page) == ["span-1/d", "span-1/a"]


@pytest.mark.parametrize(
    ("text", "told"),
    [
        ("{", "it is cut off, or was changed by hand."),
        ("[]", "This is not a review file"),
        (Review("B9").to_text(), "This review is of B9, which is not in this package."),
        (
            '{"schema":"lineproof review 1","calc":"B1","marks":[{"line":"x"},7,null]}',
            "changed by hand: mark 1 is damaged; mark 2 is damaged; mark 3 is damaged.",
        ),
        ('{"schema":"lineproof review 1","calc":"B1","findings":{}}', "findings is no list"),
    ],
)
def test_a_damaged_file_changes_nothing(opened: Open, text: str, told: str) -> None:
    page = opened()
    row(page, "last/r").locator(".result").click()
    page.keyboard.press("a")
    before = margins(page)
    bring(page, text, "bad.json")
    assert told in status(page)
    assert status(page).endswith("Nothing was changed.")
    assert margins(page) == before


def test_a_review_printed_with_the_package_is_there_at_once(opened: Open) -> None:
    page = opened(html_with(with_finding()))
    assert margins(page) == {"data/b": "finding 4"}
    assert "Width?" in page.locator("[data-rv=findings]").inner_text()


def test_marks_are_kept_in_the_browser_until_they_are_saved(opened: Open) -> None:
    page = opened()
    row(page, "last/r").locator(".result").click()
    page.keyboard.press("a")
    assert "are not in a file yet" in page.locator("[data-rv=kept]").inner_text()
    page.reload()
    page.get_by_role("button", name="Review", exact=True).click()
    assert margins(page) == {"last/r": "✓ accepted"}
    assert page.locator("[data-rv=person-name]").inner_text() == "Reviewed by Kei Mori (KM)"


def test_a_printed_mark_that_was_taken_back_does_not_come_back(opened: Open) -> None:
    """The page holds the printed review for ever; what was done since counts."""
    review = marked(
        Review("B1", reviewers=(MORI,)), beam(), ["last/r", "data/b"], by="Kei Mori", at=AT
    )
    page = opened(html_with(review))
    row(page, "last/r").locator(".result").click()
    page.keyboard.press("x")
    page.reload()
    page.get_by_role("button", name="Review", exact=True).click()
    assert margins(page) == {"data/b": "✓ accepted"}


def test_a_browser_that_keeps_nothing_is_told_of(opened: Open, context: BrowserContext) -> None:
    context.add_init_script(
        "Object.defineProperty(window, 'localStorage', { get() { throw new Error('no'); } });"
    )
    page = opened()
    row(page, "last/r").locator(".result").click()
    page.keyboard.press("a")
    assert "save before you close" in page.locator("[data-rv=kept]").inner_text()
    assert len(read_review(saved(page)).marks) == 1


def test_each_calc_of_a_package_has_its_own_file(opened: Open) -> None:
    records = [beam(), beam(h="700 mm", calc="B2")]
    page = opened(to_html(build_package(records)))
    row(page, "B2/last/r").locator(".result").click()
    page.keyboard.press("a")
    with page.expect_download() as caught:
        page.get_by_role("button", name="Save B2 to file").click()
    assert caught.value.suggested_filename == "B2.review.json"
    review = read_review(Path(caught.value.path()).read_text(encoding="utf-8"))
    assert [(mark.line, mark.record) for mark in review.marks] == [("last/r", records[1].digest)]
    row(page, "B1/last/r").locator(".result").click()
    assert page.get_by_text("0 of 11 lines marked").is_visible()
