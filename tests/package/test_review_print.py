"""The review record in the printed package: HTML and PDF, the record itself untouched."""

from __future__ import annotations

import copy
import io
import re
import xml.etree.ElementTree as ET
from dataclasses import replace
from typing import Any

import pypdf
import pytest

from lineproof.audit.data import Severity
from lineproof.audit.review.data import Raised, Review, Reviewer, Said, State
from lineproof.audit.review.marks import TO_CHECK, marked, sign
from lineproof.audit.review.print import printed_review
from lineproof.audit.review.read import read_review
from lineproof.package import build_package, records_in_html, records_in_pdf, to_html, to_pdf
from lineproof.package.read import reviews_in_html, reviews_in_pdf
from lineproof.record import Record

AT, LATER = "2026-12-01T15:05:33Z", "2026-12-03T09:00:00Z"
FINDING = Raised(
    3, Severity.MAJOR, "Cover <b>40</b> #let is not on A-210.", "Kei Mori", AT,
    ("inputs/c_c", "gone/x"), (Said("A. Verdon", LATER, "It is on S-201."),),
)  # fmt: skip


@pytest.fixture
def calc(record: dict[str, Any]) -> Record:
    return Record(record)


def all_lines(calc: Record) -> list[str]:
    return [line for line, entry in calc.entries.items() if entry["kind"] in TO_CHECK]


def reviewed(calc: Record) -> Review:
    """All lines accepted by one, one queried and one commented by another, one finding."""
    review = Review("B7", (Reviewer("Kei Mori", "KM"), Reviewer("Ines Ott", "IO")))
    review = marked(review, calc, all_lines(calc), by="Kei Mori", at=AT)
    review = marked(
        review, calc, ["flexure/M_r"], by="Ines Ott", at=AT, state=State.QUERIED, note="why d?"
    )
    return replace(review, findings=(FINDING,))


def words_of(page: str) -> str:
    body = ET.fromstring(page.removeprefix("<!DOCTYPE html>")).find("body")  # noqa: S314 - our own
    assert body is not None
    for script in [*body.iter("script"), *body.iter("template")]:
        script.clear()
    return " ".join("".join(body.itertext()).split())


def words_of_pdf(content: bytes) -> str:
    pages = pypdf.PdfReader(io.BytesIO(content)).pages
    return " ".join(" ".join(page.extract_text() for page in pages).split())


TOLD = (
    "Reviewed by Ines Ott (IO), Kei Mori (KM).",
    "Cover <b>40</b> #let is not on A-210.",
    "A. Verdon, 2026-12-03: It is on S-201.",
    "gone/x (no longer in the calc)",
    "arithmetic checked by Kei Mori, arithmetic queried by Ines Ott",
    "IO, 2026-12-01, arithmetic queried: why d?",
    "finding 3, major, answered: Cover",
)


def test_the_review_stands_in_both_prints(calc: Record) -> None:
    package = build_package([calc], reviews=[printed_review(reviewed(calc), calc)])
    page, content = to_html(package), to_pdf(package)
    assert [told for told in TOLD if told not in words_of(page)] == []
    squeezed = words_of_pdf(content).replace(" ", "")
    assert [told for told in TOLD if told.replace(" ", "") not in squeezed] == []
    assert page == to_html(package)
    assert content == to_pdf(package)


def test_printing_a_review_leaves_the_record_as_it_is(calc: Record) -> None:
    before = copy.deepcopy(calc.data)
    package = build_package([calc], reviews=[printed_review(reviewed(calc), calc)])
    assert calc.data == before
    assert records_in_html(to_html(package)) == [before]
    assert records_in_pdf(to_pdf(package)) == [before]


def test_the_review_travels_inside_the_package(calc: Record) -> None:
    review = reviewed(calc)
    package = build_package([calc], reviews=[printed_review(review, calc)])
    (from_page,), (from_pdf,) = reviews_in_html(to_html(package)), reviews_in_pdf(to_pdf(package))
    assert from_pdf == review.to_text()
    assert read_review(from_page).to_text() == review.to_text()
    plain = build_package([calc])
    assert (reviews_in_html(to_html(plain)), reviews_in_pdf(to_pdf(plain))) == ([], [])


def test_every_link_of_the_review_has_a_target(calc: Record) -> None:
    page = to_html(build_package([calc], reviews=[printed_review(reviewed(calc), calc)]))
    root = ET.fromstring(page.removeprefix("<!DOCTYPE html>"))  # noqa: S314 - our own page
    ids = {element.get("id") for element in root.iter()}
    links = {link.get("href") or "" for link in root.iter("a")}
    assert "#inputs/c_c" in links
    assert {link for link in links if link.removeprefix("#") not in ids} == set()


def test_ticks_alone_stand_in_the_table_not_beside_every_line(calc: Record) -> None:
    """So that lines that repeat others stay short."""
    review = marked(
        Review("B7", (Reviewer("Kei Mori", "KM"),)), calc, all_lines(calc), by="Kei Mori", at=AT
    )
    printed = printed_review(review, calc)
    assert printed.notes == {}
    count = len(all_lines(calc))
    assert printed.summary.startswith(f"{count} lines to check; {count} accepted; 0 seen;")
    inputs = next(tally for tally in printed.tallies if tally.title == "Given")
    assert inputs.counts == ("9", "9", "–", "–", "–", "–")  # the nine given values of the part


def changed(calc: Record) -> Record:
    """The same calc with a depth of 650 mm typed: by digest, as if it had been run again."""
    data = copy.deepcopy(calc.data)
    for part in data["parts"]:
        for entry in part["entries"]:
            if entry["id"] == "inputs/h":
                entry["typed"] = "650 mm"
            if entry["id"] in ("inputs/h", "section/d", "flexure/M_r", "flexure/moment"):
                entry["digest"] = "0" * 16
    return Record(data | {"digest": "1" * 16})


def test_stale_marks_are_listed_under_what_has_changed(calc: Record) -> None:
    review = marked(
        Review("B7", (Reviewer("Kei Mori", "KM"),)), calc,
        ["inputs/h", "section/d", "flexure/M_r", "inputs/b_w"], by="Kei Mori", at=AT,
    )  # fmt: skip
    now = changed(calc)
    text = words_of(to_html(build_package([now], reviews=[printed_review(review, now)])))
    assert "Marked before a change" in text
    assert "Overall depth (1.4) was 24.4 in, is 650 mm.3 marks by KM1.4, 4.6, 5.5" in text
    assert "3 marked before a change" in text


def test_many_changes_make_no_endless_list(calc: Record) -> None:
    """Every input changed: the changes that touch most lines stand alone, the rest together."""
    review = marked(
        Review("B7", (Reviewer("Kei Mori", "KM"),)), calc, all_lines(calc), by="Kei Mori", at=AT
    )
    data = copy.deepcopy(calc.data)
    for part in data["parts"]:
        for entry in part["entries"]:
            entry["digest"] = "0" * 16
    printed = printed_review(review, Record(data | {"digest": "1" * 16}))
    assert len(printed.stale) == 26
    assert printed.stale[-1].why == "Other changes, several to a line."
    told = {line for stale in printed.stale for line, _ in stale.lines}
    assert told == set(all_lines(calc))


def test_a_sign_off_is_printed_with_the_digest_and_stands_on_the_cover(calc: Record) -> None:
    review = marked(
        Review("B7", (Reviewer("Kei Mori", "KM"),)), calc, all_lines(calc), by="Kei Mori", at=AT
    )
    review = sign(review, calc, "Kei Mori", "2026-12-04")
    package = build_package([calc], reviews=[printed_review(review, calc)])
    text = words_of(to_html(package))
    told = f"Signed off by Kei Mori on 2026-12-04 for the record {calc.digest}, which is this one."
    assert told in text
    assert "Checked byKei Mori, 2026-12-04" in text
    assert "Kei Mori, 2026-12-04" in words_of_pdf(to_pdf(package))


def test_a_sign_off_of_an_earlier_record_does_not_hold(calc: Record) -> None:
    review = marked(
        Review("B7", (Reviewer("Kei Mori", "KM"),)), calc, all_lines(calc), by="Kei Mori", at=AT
    )
    review = sign(review, calc, "Kei Mori", "2026-12-04")
    printed = printed_review(review, changed(calc))
    assert printed.checked_by == ""
    assert "it has changed since, and the sign-off does not hold" in printed.signed[0]


def test_a_finding_raised_after_the_sign_off_is_told_beside_it(calc: Record) -> None:
    review = marked(
        Review("B7", (Reviewer("Kei Mori", "KM"),)), calc, all_lines(calc), by="Kei Mori", at=AT
    )
    review = sign(review, calc, "Kei Mori", "2026-12-04")
    printed = printed_review(replace(review, findings=(FINDING,)), calc)
    assert printed.checked_by == ""
    assert "since then this stands open: 1 finding not closed: 3" in printed.signed[0]


def test_without_a_review_the_form_to_fill_in_stays(calc: Record) -> None:
    page = to_html(build_package([calc]))
    assert len(re.findall(r"<tr><td></td><td></td><td></td><td></td></tr>", page)) == 11


def test_each_calc_of_a_package_has_its_own_review(calc: Record) -> None:
    """The same ids stand in both; only one is queried."""
    other = Record(copy.deepcopy(calc.data) | {"calc": {"id": "B8", "title": "Beam B8"}})
    package = build_package([calc, other], reviews=[printed_review(reviewed(calc), calc), None])
    page = to_html(package)
    assert page.count("arithmetic queried: why d?") == 1
    assert 'href="#B7/inputs/c_c"' in page
    assert [review.calc for review in package.reviews] == ["B7"]
    assert package.facts.signatures[1].value == ""
