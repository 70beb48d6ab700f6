"""Packages issued with the review of their calc: notes beside lines, review record, sign-off."""

from __future__ import annotations

from tests.audit import verifying as by

from lineproof.audit.data import Severity
from lineproof.audit.review.data import Raised, Review, Reviewer
from lineproof.audit.review.marks import marked
from lineproof.audit.review.print import printed_review
from lineproof.audit.verify.verification import Outcome, verify
from lineproof.package import Package, build_package, to_html, to_pdf

AT = "2026-12-01T15:05:33Z"


def reviewed() -> Package:
    """The small package, its line of M_f marked and a finding written about it."""
    finding = Raised(
        1, Severity.MAJOR, "Span of 6 m is not on the drawing.", "Kei Mori", AT, ("beam/M_f",)
    )
    review = Review("H1", reviewers=(Reviewer("Kei Mori", "KM"),), findings=(finding,))
    review = marked(review, by.record(), ("beam/M_f",), by="Kei Mori", at=AT)
    return build_package([by.record()], reviews=[printed_review(review, by.record())])


def test_a_reviewed_package_is_intact_as_a_page_and_as_a_pdf() -> None:
    page, pdf = to_html(reviewed()).encode(), to_pdf(reviewed())

    found = [verify(page, "b.html"), verify(pdf, "b.pdf")]

    assert b"Span of 6 m is not on the drawing." in page
    assert [(f.outcome, f.alterations) for f in found] == [(Outcome.INTACT, ())] * 2


def test_a_finding_changed_in_the_print_is_found() -> None:
    page = to_html(reviewed())
    start = page.index("<main>")

    forged = page[:start] + page[start:].replace("Span of 6 m is not", "Span of 8 m is not", 1)

    assert verify(forged.encode(), "b.html").outcome is Outcome.ALTERED


def test_a_digit_of_a_finding_changed_in_a_pdf_is_found() -> None:
    pdf = to_pdf(reviewed())
    pages = {spot.page for spot in by.spots(pdf)}
    last = [spot for spot in by.spots(pdf) if spot.page == max(pages) - 1]

    forged = by.redrawn(pdf, last[0].page, last[0].put("9" if last[0].digit != "9" else "8"))

    assert verify(forged, "b.pdf").outcome is Outcome.ALTERED
