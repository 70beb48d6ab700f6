"""Reviewing in the HTML package itself: opened from a file, offline, in Chromium."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING, Any

import pytest

from lineproof.audit.data import Severity
from lineproof.audit.review.data import Raised, Review, Reviewer, State
from lineproof.audit.review.marks import marked, stale_marks, standing
from lineproof.audit.review.print import printed_review
from lineproof.audit.review.read import read_review
from lineproof.notebook.read import read_calc
from lineproof.package import build_package, to_html
from lineproof.record import Record
from lineproof.resources import folder
from lineproof.sheet import Sheet

if TYPE_CHECKING:
    from playwright.sync_api import Browser, BrowserContext, Locator, Page

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


@pytest.fixture
def context(browser: Browser) -> Iterator[BrowserContext]:
    made = browser.new_context(viewport={"width": 1400, "height": 900}, offline=True)
    yield made
    made.close()


@pytest.fixture
def opened(context: BrowserContext, tmp_path: Path) -> Iterator[Open]:
    """Open a package as a file, with the tools open; whatever the page complains of is a fault."""
    said: list[str] = []

    def open_page(html: str | None = None, name: str = "beam.html", who: str = "Kei Mori") -> Page:
        path = tmp_path / name
        path.write_text(html or to_html(build_package([beam()])), encoding="utf-8")
        page = context.new_page()
        page.on("console", lambda message: said.append(message.text))
        page.on("pageerror", lambda error: said.append(str(error)))
        page.goto(path.as_uri())
        page.get_by_role("button", name="Review", exact=True).click()
        if who:
            page.get_by_label("Your name").fill(who)
            page.get_by_label("Initials").fill("KM")
        return page

    yield open_page
    assert said == []


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


# Tracing ------------------------------------------------------------------------------------------


def test_clicking_a_value_lights_where_it_comes_from_and_goes(opened: Open) -> None:
    page = opened()
    row(page, "span-1/d").locator(".result").click()
    assert traces(page) == {
        "span-1/d": "here", "data/h": "rests on", "span-1/within": "goes into",
    }  # fmt: skip
    assert "2.1 Effective depth: not marked; rests on 1, goes into 1." in status(page)


def test_the_whole_chain_is_lit_on_demand_each_way_apart(opened: Open) -> None:
    """By hand: the check rests on d and a, these on h, A_s and b; h goes into five other lines."""
    page = opened()
    row(page, "span-1/within").locator(".result").click()
    page.get_by_role("button", name="to the givens").click()
    assert traces(page) == {
        "span-1/within": "here", "span-1/d": "rests on", "span-1/a": "rests on",
        "data/h": "rests on, further", "data/A_s": "rests on, further",
        "data/b": "rests on, further",
    }  # fmt: skip
    row(page, "data/h").locator(".result").click()
    page.get_by_role("button", name="to the checks").click()
    assert traces(page) == {
        "data/h": "here", "span-1/d": "goes into", "span-2/d": "goes into",
        "last/r": "goes into", "last/wide": "goes into",
        "span-1/within": "goes into, further", "span-2/within": "goes into, further",
    }  # fmt: skip
    group = page.get_by_role("group", name="What rests on the line")
    group.get_by_role("button", name="hide").click()
    assert traces(page) == {"data/h": "here"}
    assert group.get_by_role("button", name="hide").get_attribute("aria-pressed") == "true"


def test_the_lines_around_are_listed_and_lead_on(opened: Open) -> None:
    page = opened()
    row(page, "span-1/within").locator(".result").click()
    page.locator("[data-rv=args] button", has_text="2.1 Effective depth").click()
    assert here(page) == "span-1/d"
    page.keyboard.press("o")
    assert here(page) == "span-1/within"


def test_light_is_told_in_words_and_frames_and_not_by_colour_only(opened: Open) -> None:
    page = opened()
    row(page, "span-1/d").locator(".result").click()
    words = page.evaluate(
        "['span-1/d', 'data/h', 'span-1/within'].map(id => getComputedStyle("
        "document.getElementById(id), '::after').content)"
    )
    assert words == ['"here"', '"rests on"', '"goes into"']


def test_a_value_opens_the_tools_and_a_link_stays_a_link(
    context: BrowserContext, tmp_path: Path
) -> None:
    path = tmp_path / "beam.html"
    path.write_text(to_html(build_package([beam()])), encoding="utf-8")
    page = context.new_page()
    page.goto(path.as_uri())
    tools = page.get_by_role("complementary", name="Review tools")
    row(page, "span-1/d").locator("a").click()
    assert page.evaluate("location.hash") == "#data/h"
    assert tools.count() == 0
    row(page, "span-1/d").locator(".result").click()
    assert tools.is_visible()
    row(page, "span-1/d").locator("a").click()
    page.locator(".rv-here[id='data/h']").wait_for()
    page.get_by_role("button", name="Close").click()
    assert not tools.is_visible()
    assert traces(page) == {}


# Filter -------------------------------------------------------------------------------------------


def test_filters_show_what_they_say(opened: Open) -> None:
    page = opened()
    show = page.get_by_role("group", name="Lines shown")
    show.get_by_role("button", name="Checks 3", exact=True).click()
    assert shown(page) == ["span-1/within", "span-2/within", "last/wide"]
    assert not page.get_by_role("heading", name="1 Data").is_visible()
    assert page.get_by_role("heading", name="4 Last").is_visible()
    show.get_by_role("button", name="Failing checks 1").click()
    assert shown(page) == ["last/wide"]
    assert "Failing checks: 1 lines shown" in status(page)
    show.get_by_role("button", name="All 11").click()
    assert shown(page) == list(ORDER)


def test_stepping_keeps_to_the_lines_shown(opened: Open) -> None:
    page = opened()
    page.keyboard.press("Escape")
    page.keyboard.press("2")
    walked = []
    for _ in range(3):
        page.keyboard.press("n")
        walked.append(here(page))
    assert walked == ["span-1/within", "span-2/within", "last/wide"]
    page.keyboard.press("n")
    assert "No further line" in status(page)
    page.keyboard.press("p")
    assert here(page) == "span-2/within"


def test_unmarked_and_queried_lines_are_found(opened: Open) -> None:
    page = opened()
    page.keyboard.press("Escape")
    for key in ("n", "a", "n", "q", "n"):
        page.keyboard.press(key)
    page.keyboard.press("6")
    assert shown(page) == ["data/h"]
    page.keyboard.press("5")
    assert shown(page) == list(ORDER[2:])
    page.keyboard.press("1")
    page.keyboard.press("p")
    page.keyboard.press("p")
    page.keyboard.press("m")
    assert here(page) == "data/A_s"


# Keyboard and marks -------------------------------------------------------------------------------


def test_the_keyboard_steps_line_by_line_and_marks(opened: Open) -> None:
    page = opened()
    page.keyboard.press("Escape")
    walked = []
    for _ in ORDER:
        page.keyboard.press("n")
        walked.append(here(page))
        assert page.evaluate("document.activeElement.id") == walked[-1]
    assert walked == list(ORDER)
    page.keyboard.press("a")
    page.keyboard.press("p")
    page.keyboard.press("s")
    page.keyboard.press("p")
    page.keyboard.press("q")
    found = margins(page)
    assert found == {"last/wide": "✓ accepted", "last/r": "seen", "span-2/within": "? query"}
    page.keyboard.press("x")
    assert "span-2/within" not in margins(page)
    assert page.get_by_text("2 of 11 lines marked").is_visible()


def test_mark_and_trace_of_a_low_line_stand_below_each_other(opened: Open) -> None:
    """A given is one line of text high: two texts, each at its own place, would overprint."""
    page = opened()
    row(page, "data/h").locator(".result").click()
    page.keyboard.press("a")
    before, after = page.evaluate(
        "['::before', '::after'].map(p => {"
        "const s = getComputedStyle(document.getElementById('data/h'), p);"
        "return [s.content, s.display, s.whiteSpace]})"
    )
    assert (before[0], before[2]) == ('"✓ accepted\\a here"', "pre-line")
    assert after[1] == "none"


def test_keys_do_nothing_while_one_types_or_when_they_are_off(opened: Open) -> None:
    page = opened()
    row(page, "span-1/d").locator(".result").click()
    page.keyboard.press("c")
    page.keyboard.type("a n q 2 x")
    assert page.get_by_label("Comment").input_value() == "a n q 2 x"
    assert (here(page), margins(page), shown(page)) == ("span-1/d", {}, list(ORDER))
    page.keyboard.press("Escape")
    page.keyboard.press("Control+a")
    assert margins(page) == {}
    page.get_by_text("Keys", exact=True).click()
    page.get_by_label("keys are on").uncheck()
    row(page, "span-1/d").locator(".result").click()
    page.keyboard.press("a")
    page.keyboard.press("n")
    assert (here(page), margins(page)) == ("span-1/d", {})


def test_every_key_is_told_on_the_page(opened: Open) -> None:
    page = opened()
    page.get_by_text("Keys", exact=True).click()
    told = page.locator(".rv-keys dt").all_inner_texts()
    assert told == [
        "n, p", "m", "a, s, q", "x", "c", "f", "i", "u, d", "1 to 7", "o", "Esc",
    ]  # fmt: skip


def test_arithmetic_is_marked_apart_from_the_assumption(opened: Open) -> None:
    page = opened()
    row(page, "data/h").locator(".result").click()
    assert page.get_by_role("button", name="Assumption accepted").is_visible()
    page.keyboard.press("a")
    row(page, "span-1/d").locator(".result").click()
    page.keyboard.press("a")
    page.keyboard.press("i")
    page.keyboard.press("a")
    review = read_review(saved(page))
    assert {(mark.line, mark.words) for mark in review.marks} == {
        ("data/h", "assumption accepted"),
        ("span-1/d", "arithmetic checked"),
        ("span-1/d", "assumption accepted"),
        ("span-2/d", "arithmetic checked"),  # repeats 2.1, as the page says
    }


def test_a_query_does_not_spread_to_lines_that_repeat(opened: Open) -> None:
    page = opened()
    row(page, "span-1/a").locator(".result").click()
    page.keyboard.press("q")
    assert margins(page) == {"span-1/a": "? query"}
    page.keyboard.press("a")
    assert "with 1 that repeat it" in status(page)
    assert margins(page) == {"span-1/a": "✓ accepted", "span-2/a": "✓ accepted"}


def test_a_comment_is_kept_with_the_mark(opened: Open) -> None:
    page = opened()
    row(page, "last/r").locator(".result").click()
    page.keyboard.press("c")
    page.keyboard.type("Why h over b?")
    page.get_by_role("button", name="Keep comment").click()
    assert page.locator("[data-rv=marks] li").inner_text().endswith("seen: Why h over b?")
    page.keyboard.press("Escape")
    page.keyboard.press("q")
    (mark,) = read_review(saved(page)).marks
    assert (mark.state, mark.note, mark.by) == (State.QUERIED, "Why h over b?", "Kei Mori")


def test_a_name_is_asked_for_and_the_originator_cannot_mark(opened: Open) -> None:
    page = opened(who="")
    row(page, "last/r").locator(".result").click()
    page.keyboard.press("a")
    assert "Write your name first" in status(page)
    assert page.evaluate("document.activeElement.dataset.rv") == "name"
    page.get_by_label("Your name").fill("a verdon")
    page.keyboard.press("Escape")
    page.keyboard.press("a")
    assert "A. Verdon prepared this calc and cannot check it" in status(page)
    assert margins(page) == {}


# Findings -----------------------------------------------------------------------------------------


def test_a_finding_is_written_answered_back_checked_and_closed(opened: Open) -> None:
    page = opened()
    row(page, "span-1/d").locator(".result").click()
    page.keyboard.press("f")
    assert page.get_by_label("Lines, by number").input_value() == "2.1"
    page.get_by_label("Lines, by number").fill("2.1, 9.9")
    page.get_by_label("How grave").select_option("major")
    page.get_by_label("Finding", exact=True).fill("Cover <b>missing</b>")
    page.get_by_role("button", name="Add finding").click()
    assert "There is no line 9.9; write numbers such as 1.1." in status(page)
    page.get_by_label("Lines, by number").fill("2.1 1.2")
    page.get_by_role("button", name="Add finding").click()
    assert "Finding 1 is written down." in status(page)
    assert margins(page) == {"data/h": "finding 1", "span-1/d": "finding 1"}
    item = page.locator("[data-rv=findings] > li")
    assert "Cover <b>missing</b>" in item.inner_text()
    steps = (("A. Verdon", "Answer", "It is."), ("Kei Mori", "Back-check", "Right."),
             ("Kei Mori", "Close", ""))  # fmt: skip
    for who, what, text in steps:
        if not page.get_by_label("Your name").is_visible():
            page.locator("[data-rv=person-name]").click()
        page.get_by_label("Your name").fill(who)
        if not page.get_by_label("About finding 1").is_visible():
            item.get_by_text("Answer, back-check, close").click()
        page.get_by_label("About finding 1").fill(text)
        item.get_by_role("button", name=what, exact=True).press("Enter")
        assert page.evaluate("document.activeElement.textContent") == what  # not lost to the body
        assert page.get_by_label("About finding 1").input_value() == ""
    assert "Finding 1: closed." in status(page)
    assert margins(page) == {}
    (found,) = read_review(saved(page)).findings
    assert (found.number, found.severity, found.lines) == (
        1, Severity.MAJOR, ("span-1/d", "data/h"),
    )  # fmt: skip
    assert [(said.by, said.text) for said in (*found.responses, *found.back_checks)] == [
        ("A. Verdon", "It is."),
        ("Kei Mori", "Right."),
    ]
    assert found.is_closed


def test_what_is_being_written_about_a_finding_outlasts_a_mark(opened: Open) -> None:
    page = opened(html_with(with_finding()))
    page.get_by_text("Answer, back-check, close").click()
    page.get_by_label("About finding 4").fill("Not on the")
    row(page, "data/h").locator(".result").click()
    page.get_by_role("button", name="Assumption accepted").click()
    assert margins(page)["data/h"] == "✓ accepted"
    assert page.get_by_label("About finding 4").input_value() == "Not on the"


def test_a_filter_that_hides_the_line_in_hand_is_stepped_from_its_first_line(opened: Open) -> None:
    page = opened(html_with(with_finding()))
    row(page, "last/wide").locator(".result").click()
    page.get_by_role("button", name="Findings 1").click()
    page.keyboard.press("n")
    assert page.locator(".rv-here").get_attribute("id") == "data/b"


def test_the_originator_answers_but_does_not_close(opened: Open) -> None:
    page = opened(html_with(with_finding()), who="A. Verdon")
    item = page.locator("[data-rv=findings] > li")
    item.get_by_text("Answer, back-check, close").click()
    item.get_by_role("button", name="Close").click()
    assert "cannot check it" in status(page)
    page.get_by_label("About finding 4").fill("It is on the drawing.")
    item.get_by_role("button", name="Answer", exact=True).click()
    assert "Finding 4: answered." in status(page)


def with_finding() -> Review:
    found = Raised(4, Severity.MINOR, "Width?", "Kei Mori", AT, ("data/b",))
    return replace(Review("B1", reviewers=(MORI,)), findings=(found,))


def html_with(review: Review) -> str:
    record = beam()
    return to_html(build_package([record], reviews=[printed_review(review, record)]))


# The file -----------------------------------------------------------------------------------------


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
    assert told.endswith("arithmetic checked; stale: changed since: 1.2 Depth")
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


# What else a page must be -------------------------------------------------------------------------


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


@pytest.mark.parametrize("width", [1400, 1000, 400])
def test_the_page_is_never_wider_than_the_window(opened: Open, width: int) -> None:
    page = opened()
    page.set_viewport_size({"width": width, "height": 800})
    row(page, "span-1/d").locator(".result").click()
    page.keyboard.press("a")
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
