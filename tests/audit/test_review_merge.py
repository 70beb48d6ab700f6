"""Merging two reviews: whichever comes first, nothing is lost, what differs is named."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace

import pytest
from hypothesis import given, settings
from tests.audit.review_random import DIGEST, NAMES, RECORD, TIMES, reviews

from lineproof.audit.data import Severity
from lineproof.audit.review.data import (
    Kind,
    Mark,
    Raised,
    Review,
    Reviewed,
    Reviewer,
    Said,
    State,
)
from lineproof.audit.review.merge import conflicts, merge
from lineproof.audit.review.read import read_review
from lineproof.errors import UserError


@given(reviews, reviews)
@settings(max_examples=150, deadline=None)
def test_which_file_comes_first_does_not_matter(first: Review, second: Review) -> None:
    one, other = merge(first, second), merge(second, first)
    assert one.review == other.review
    assert set(one.conflicts) == set(other.conflicts)


@given(reviews, reviews)
@settings(max_examples=150, deadline=None)
def test_nothing_is_lost(first: Review, second: Review) -> None:
    """A mark is missing only where its own reviewer marked the same again later."""
    made = merge(first, second).review
    for mark in (*first.marks, *second.marks):
        later = [m for m in made.marks if m.place == mark.place and m.at > mark.at]
        assert mark in made.marks or later
    by_origin = {found.origin: found for found in made.findings}
    for found in (*first.findings, *second.findings):
        kept = by_origin[found.origin]
        assert set(found.lines) <= set(kept.lines)
        assert set(found.responses) <= set(kept.responses)
        assert set(found.back_checks) <= set(kept.back_checks)
        assert set(found.closed) <= set(kept.closed)
    assert set(made.signed) == set(first.signed) | set(second.signed)


@given(reviews, reviews)
@settings(max_examples=150, deadline=None)
def test_numbers_stay_unique_and_the_file_readable(first: Review, second: Review) -> None:
    made = merge(first, second).review
    numbers = [found.number for found in made.findings]
    assert len(numbers) == len(set(numbers))
    assert read_review(made.to_text()) == made


@given(reviews, reviews)
@settings(max_examples=150, deadline=None)
def test_merging_again_changes_nothing(first: Review, second: Review) -> None:
    """Also not a number that was given anew: the file that brought it may come again."""
    made = merge(first, second).review
    assert merge(made, made).review == made
    assert merge(made, second).review == made


@given(reviews, reviews)
@settings(max_examples=100, deadline=None)
def test_accepted_and_queried_is_a_conflict(first: Review, second: Review) -> None:
    """Searched apart, over all pairs of marks that stand."""
    made = merge(first, second)
    told = {conflict.what for conflict in made.conflicts}
    for one in made.review.marks:
        for other in made.review.marks:
            if (one.line, one.kind) == (other.line, other.kind) and {one.state, other.state} == {
                State.ACCEPTED,
                State.QUERIED,
            }:
                assert one.line in told


def mark(by: str, state: State, note: str = "") -> Mark:
    return Mark("data/h", Kind.ASSUMPTION, state, by, TIMES[0], DIGEST, RECORD, note)


def review(*marks_: Mark, findings_: tuple[Raised, ...] = ()) -> Review:
    return Review(
        "B1",
        (Reviewer(NAMES[0], "KM"), Reviewer(NAMES[1], "IO")),
        (Reviewed(RECORD, {"data/h": DIGEST}),),
        findings_,
        marks_,
    )


def test_a_conflict_of_marks_is_told_and_both_stand() -> None:
    made = merge(
        review(mark("Kei Mori", State.ACCEPTED)),
        review(mark("Ines Ott", State.QUERIED, "drawing says 650")),
    )
    assert [conflict.sentence for conflict in made.conflicts] == [
        (
            "data/h: assumption accepted by Kei Mori, "
            "assumption queried by Ines Ott (“drawing says 650”)"
        )
    ]
    assert len(made.review.marks) == 2


def test_one_reviewer_with_two_marks_of_one_time_is_a_conflict() -> None:
    made = merge(
        review(mark("Kei Mori", State.ACCEPTED, "a")), review(mark("Kei Mori", State.ACCEPTED, "b"))
    )
    assert len(made.review.marks) == 2
    assert [conflict.what for conflict in made.conflicts] == ["data/h"]


def test_two_who_agree_are_no_conflict() -> None:
    made = merge(
        review(mark("Kei Mori", State.ACCEPTED)), review(mark("Ines Ott", State.SEEN))
    )  # fmt: skip
    assert made.conflicts == ()


COVER = Raised(1, Severity.MAJOR, "Cover", "Kei Mori", TIMES[0], ("data/h",))
SPAN = Raised(1, Severity.MINOR, "Span", "Ines Ott", TIMES[1], ("data/b",))


def test_a_number_that_two_gave_is_given_anew_to_the_later() -> None:
    made = merge(review(findings_=(COVER,)), review(findings_=(SPAN,)))
    assert [(f.number, f.text) for f in made.review.findings] == [(1, "Cover"), (2, "Span")]
    assert [conflict.sentence for conflict in made.conflicts] == [
        "finding 1 of Ines Ott is now finding 2: its number was taken by another"
    ]


def test_answers_that_differ_are_both_shown() -> None:
    yes = replace(COVER, responses=(Said("A. Verdon", TIMES[1], "It is on S-501."),))
    no = replace(COVER, responses=(Said("P. Reyes", TIMES[2], "Will be changed."),))
    made = merge(review(findings_=(yes,)), review(findings_=(no,)))
    assert [conflict.sentence for conflict in made.conflicts] == [
        (
            "finding 1: answered differently: “It is on S-501.” by A. Verdon, "
            "“Will be changed.” by P. Reyes"
        )
    ]
    (found,) = made.review.findings
    assert [each.text for each in found.responses] == ["It is on S-501.", "Will be changed."]


def test_a_back_check_settles_which_answer_holds() -> None:
    answers = (Said("A. Verdon", TIMES[1], "Yes."), Said("P. Reyes", TIMES[2], "No."))
    settled = replace(COVER, responses=answers, back_checks=(Said("Kei Mori", TIMES[3], "No."),))
    assert len(conflicts(review(findings_=(replace(COVER, responses=answers),)))) == 1
    assert conflicts(review(findings_=(settled,))) == ()


def test_closed_in_one_file_and_answered_later_in_the_other_is_told() -> None:
    closed = replace(COVER, closed=(Said("Kei Mori", TIMES[1]),))
    answered = replace(COVER, responses=(Said("A. Verdon", TIMES[2], "Wait."),))
    made = merge(review(findings_=(closed,)), review(findings_=(answered,)))
    assert [conflict.sentence for conflict in made.conflicts] == [
        "finding 1: closed by Kei Mori, but more was written since"
    ]
    assert not made.review.findings[0].is_closed


@pytest.mark.parametrize(
    ("change", "told"),
    [
        (lambda r: replace(r, reviewers=(Reviewer("Kei Mori", "KMO"),)), "'KM' and 'KMO'"),
        (
            lambda r: replace(r, findings=(replace(COVER, severity=Severity.MINOR),)),
            "finding 1 is major and minor in the two files",
        ),
    ],
)
def test_what_else_differs_is_told(change: Callable[[Review], Review], told: str) -> None:
    first = review(findings_=(COVER,))
    made = merge(first, change(first))
    assert any(told in conflict.sentence for conflict in made.conflicts)


def test_reviews_of_two_calcs_are_not_merged() -> None:
    with pytest.raises(UserError, match="reviews of two calcs, 'B1' and 'B2', are not merged"):
        merge(review(), replace(review(), calc="B2"))
