"""The page's own rules are those of the command: reading, merging, writing, what is stale."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import combinations
from typing import TYPE_CHECKING, Any

import pytest
from hypothesis import Phase, given, settings
from hypothesis import strategies as st
from tests.audit.review_random import reviews

from lineproof.audit.review.data import Review, Reviewer
from lineproof.audit.review.marks import Cause, marked, stale_marks, standing, value_told
from lineproof.audit.review.merge import merge
from lineproof.package.html import TOOLS
from lineproof.quantity.units import UNITS
from lineproof.record import Record
from lineproof.resources import folder
from lineproof.sheet import Sheet

if TYPE_CHECKING:
    from playwright.sync_api import Browser, Page

RULES = "\n".join(
    (folder("templates") / "review" / f"{name}.js").read_text(encoding="utf-8")
    for name in TOOLS[:2]
)
MERGED = (
    "pairs => { RULES; return pairs.map(([one, other]) => {"
    " const made = merged(fromText(one), fromText(other));"
    " return [toText(made), made.findings.map(standingOf)]; }); }"
).replace("RULES", RULES)
STANDING = (
    "([record, text]) => { RULES;"
    " const calc = { id: record.calc.id, digest: record.digest, lines: new Map() };"
    " for (const part of record.parts) for (const entry of part.entries)"
    "  calc.lines.set(entry.id, lineOf(calc, entry));"
    " const review = fromText(text), marks = marksByLine(review), why = causesOf(calc, review);"
    " return [...calc.lines.values()].map(line => [line.id,"
    "  stateOf(line, marks.get(line.id) ?? []),"
    "  (marks.get(line.id) ?? []).filter(m => m.digest !== line.digest).map(why)]); }"
).replace("RULES", RULES)


@pytest.fixture(scope="module")
def blank(browser: Browser) -> Iterator[Page]:
    page = browser.new_page()
    yield page
    page.close()


@settings(max_examples=10, deadline=None, phases=[Phase.generate])  # shrinking takes minutes
@given(data=st.data())
def test_the_page_merges_as_the_command_does(blank: Page, data: st.DataObject) -> None:
    """Twenty pairs at a time, byte for byte."""
    pairs = data.draw(st.lists(st.tuples(reviews, reviews), min_size=20, max_size=20))
    texts = [[one.to_text(), other.to_text()] for one, other in pairs]
    made = blank.evaluate(MERGED, texts)
    for (one, other), (text, stands) in zip(pairs, made, strict=True):
        expected = merge(one, other).review
        assert text == expected.to_text()
        assert stands == [found.standing for found in expected.findings]


def beam(**changes: str) -> Record:
    typed = {"b": "400 mm", "h": "600 mm", "A_s": "2000 mm2"} | changes
    sheet = Sheet("B1", "Beam", project={"codes": {"pair": "NBC 2015 + A23.3-14"}})
    with sheet.part("data", "Data"):
        for symbol, text in typed.items():
            if symbol != "line":
                sheet.given(symbol, text, f"Value of {symbol}")
    with sheet.part("work", "Work"):
        sheet.line(changes.get("line", "d = 0.9*h"), unit="mm", title="Depth")
        sheet.line("a = 30*A_s/b", unit="mm", title="Block")
        sheet.check("a <= d", title="Block within the depth", key="within")
        sheet.line("r = h/b", unit="", title="Sides")
    return sheet.close()


def test_the_page_tells_values_as_the_command_does(blank: Page) -> None:
    units = [unit.replace("^0.5", "2") for unit in UNITS]  # no input is of a root of a unit
    texts = [f"{number} {unit}".strip() for unit in units for number in ("-12.5", "4", "1e-3")]
    texts += ["6 ft 3 in", "2-25M", "-", ""]
    told = blank.evaluate(
        "texts => { RULES; return texts.map(valueTold); }".replace("RULES", RULES), texts
    )
    assert told == [value_told(text) for text in texts]


CHANGES = {"b": "450 mm", "h": "650 mm", "A_s": "2500 mm2", "line": "d = 0.88*h"}
SUBSETS = [set_ for size in range(5) for set_ in combinations(CHANGES, size)]


@pytest.mark.parametrize("changed", SUBSETS, ids=lambda names: "-".join(names) or "none")
def test_the_page_finds_the_same_stale_lines_and_causes(
    blank: Page, changed: tuple[str, ...]
) -> None:
    then, now = beam(), beam(**{name: CHANGES[name] for name in changed})
    review = marked(
        Review("B1", reviewers=(Reviewer("Kei Mori", "KM"),)), then, then.entries,
        by="Kei Mori", at="2026-12-01T15:05:33Z",
    )  # fmt: skip
    told = blank.evaluate(STANDING, [now.data, review.to_text()])
    stands = standing(review, now)
    causes = {stale.mark.line: _words(stale.causes, now) for stale in stale_marks(review, now)}
    assert {line for line, state, _ in told if state == "stale"} == set(stands.stale)
    assert {line: set(why) for line, _, why in told if why} == {
        line: {cause} for line, cause in causes.items()
    }


def _words(causes: tuple[Cause, ...], record: Record) -> str:
    if not causes:
        return "the line itself, or one above it that nobody had marked, was written anew"
    entries: dict[str, Any] = record.entries
    return "; ".join(
        cause.told(f"{entries[cause.line]['label']} {entries[cause.line]['title']}")
        for cause in causes
    )
