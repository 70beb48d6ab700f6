"""Reviewing in the HTML package itself: opened from a file, offline, in Chromium."""

from __future__ import annotations

from lineproof.audit.data import Severity
from lineproof.audit.review.data import State
from lineproof.audit.review.read import read_review

from .review_page import (
    ORDER,
    Open,
    here,
    html_with,
    margins,
    row,
    saved,
    shown,
    status,
    traces,
    with_finding,
)

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


def test_how_far_the_light_goes_is_told_to_who_does_not_see_it(opened: Open) -> None:
    """The lines lit as above: d and a, then h, A_s and b as well; no other line rests on it."""
    page = opened()
    row(page, "span-1/within").locator(".result").click()
    told = []
    for key in "uuud":
        page.keyboard.press(key)
        told.append(status(page))
    assert told == [
        "Rests on: to the givens; 5 lines lit.", "Rests on: hidden; 0 lines lit.",
        "Rests on: next lines; 2 lines lit.", "Goes into: to the checks; 0 lines lit.",
    ]  # fmt: skip


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


def test_a_value_opens_the_tools_and_a_link_stays_a_link(shown: Open) -> None:
    page = shown()
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
    told = page.locator("#rv dl dt").all_inner_texts()
    assert told == [
        "n, p", "m", "a, s, q", "x", "c", "f", "i", "u, d", "1 to 7", "o", "t", "Esc",
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
    assert "seen, comment kept" in status(page)
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
