"""The review record: its file, what turns stale and why, originators, sign-off."""

from __future__ import annotations

import json
from collections.abc import Callable, Iterable
from dataclasses import replace
from typing import Any

import pytest

from lineproof.audit.data import Severity
from lineproof.audit.review.data import Kind, Raised, Review, Reviewer, Said, SignOff, State
from lineproof.audit.review.marks import (
    Cause,
    Stale,
    marked,
    originators,
    refused_reviewers,
    sign,
    snapshot,
    stale_marks,
    standing,
)
from lineproof.audit.review.merge import merge
from lineproof.audit.review.read import read_review
from lineproof.errors import UserError
from lineproof.record import Record
from lineproof.sheet import Sheet

AT = "2026-12-01T15:05:33Z"
MORI = Reviewer("Kei Mori", "KM")
OTT = Reviewer("Ines Ott", "IO")
ALL = ("data/b", "data/h", "data/A_s", "flexure/d", "flexure/a", "flexure/r", "flexure/enough")


def beam(
    *, h: str = "600 mm", b: str = "400 mm", depth: str = "d = 0.9*h", prepared: str = "A. Verdon"
) -> Record:
    """A small calc: two lines rest on h, one on A_s and b only."""
    project = {
        "codes": {"pair": "NBC 2015 + A23.3-14"},
        "issue": {"prepared_by": prepared, "date": "2026-12-01"},
    }
    sheet = Sheet("B1", "Beam", project=project)
    with sheet.part("data", "Data"):
        sheet.given("b", b, "width")
        sheet.given("h", h, "depth")
        sheet.given("A_s", "2000 mm2", "steel")
    with sheet.part("flexure", "Flexure"):
        sheet.line(depth, unit="mm", title="Effective depth")
        sheet.line("a = 30*A_s/b", unit="mm", title="Block")
        sheet.line("r = a/d", unit="", title="Ratio of depths")
        sheet.check("a <= d", title="Block within the section", key="enough")
    return sheet.close()


def fresh(*who: Reviewer) -> Review:
    return Review("B1", reviewers=who or (MORI,))


def all_marked(record: Record) -> Review:
    return marked(fresh(), record, ALL, by="Kei Mori", at=AT)


FINDING = Raised(
    1, Severity.MAJOR, "Cover of 60 mm is not on the drawing.", "Kei Mori", AT, ("flexure/d",)
)


# The file ---------------------------------------------------------------------------------------


def test_a_review_reads_back_as_it_was() -> None:
    said = Said("A. Verdon", AT, "S-501 revision B says so.")
    review = replace(
        all_marked(beam()),
        findings=(replace(FINDING, responses=(said,), closed=(Said("Kei Mori", AT),)),),
    )
    again = read_review(review.to_text())
    assert again.to_text() == review.to_text()
    assert set(again.marks) == set(review.marks)
    assert again.findings == review.findings
    assert dict(again.records[0].inputs).keys() == {"data/b", "data/h", "data/A_s"}
    assert again.records[0].values == {
        "data/b": "400 mm", "data/h": "600 mm", "data/A_s": "2000 mm2",
    }  # fmt: skip


def test_the_file_is_json_with_one_item_a_line() -> None:
    text = all_marked(beam()).to_text()
    data = json.loads(text)
    assert list(data) == [
        "schema", "calc", "reviewers", "records", "findings", "marks", "signed",
    ]  # fmt: skip
    assert sum('"line":"data/h"' in line for line in text.splitlines()) == 1
    # Braces 2, schema and calc 2, reviewers and records 3 each, empty lists 2, marks 2 and each 1.
    assert len(text.splitlines()) == 2 + 2 + 3 + 3 + 2 + 2 + len(ALL)


def test_an_empty_review_is_one_too() -> None:
    assert read_review(Review("B1").to_text()) == Review("B1")


def test_code_like_text_stays_text() -> None:
    nasty = "</script><script>alert(1)</script> {{ 7*7 }} #let x = 1 =1+1 \u2028"
    review = marked(fresh(), beam(), ["data/h"], by="Kei Mori", at=AT, note=nasty)
    assert read_review(review.to_text()).marks[0].note == nasty


def whole() -> dict[str, Any]:
    review = replace(all_marked(beam()), findings=(FINDING,))
    data: dict[str, Any] = json.loads(review.to_text())
    return data


@pytest.mark.parametrize(
    ("change", "told"),
    [
        (lambda d: d["marks"][0].update(state="okay"), "mark 1: state: 'okay' is not known; write"),
        (lambda d: d["marks"][1].pop("digest"), "mark 2: digest: nothing is no digest"),
        (lambda d: d["marks"][0].update(digest="XYZ"), "mark 1: digest: 'XYZ' is no digest"),
        (lambda d: d["marks"][0].update(at="yesterday"), "mark 1: at: 'yesterday' is no time"),
        (lambda d: d["marks"][0].update(at="2026-02-30T10:00:00Z"), "is no time; write such as"),
        (lambda d: d["marks"][0].update(by="Nobody"), "mark 1: 'Nobody' is not among the review"),
        (lambda d: d["marks"][0].update(record="0" * 16), "is not among the records"),
        (lambda d: d["marks"][0].update(colour="red"), "mark 1: 'colour' is not a field; there"),
        (lambda d: d["marks"].append("x"), "mark 8: is 'x', not an object"),
        (lambda d: d.update(marks={}), "marks is a dict, not a list"),
        (lambda d: d["findings"][0].update(number=0), "finding 1: number 0 is not a whole number"),
        (lambda d: d["findings"][0].update(number=True), "finding 1: number a bool is not a whole"),
        (lambda d: d["findings"][0].update(severity="fatal"), "severity: 'fatal' is not known"),
        (lambda d: d["findings"][0].update(text="x" * 4001), "longer than 4000 characters"),
        (lambda d: d["findings"][0].update(text="\ud800"), "is no text"),
        (lambda d: d["findings"][0].update(responses=[{"by": "", "at": AT}]), "by is missing"),
        (lambda d: d["findings"].append(d["findings"][0]), "finding '1' stands twice"),
        (lambda d: d["records"][0]["inputs"].update(x=1), "record 1: inputs: not a digest of 16"),
        (lambda d: d["records"][0].update(values=[1]), "record 1: values: a list is no text for"),
        (lambda d: d["records"][0].update(values={"x": 1}), "record 1: values: 1 is no text"),
        (lambda d: d["reviewers"].append({"name": "Kei Mori"}), "reviewer 'Kei Mori' stands twice"),
        (lambda d: d.update(signed=[{"record": "0" * 16, "by": "K", "on": "1.12."}]), "is no day"),
        (lambda d: d.update(calc=""), "calc is missing or empty"),
        (lambda d: d.update(schema=2), "not a review of schema 'lineproof review 1' but 2"),
    ],
)
def test_a_review_changed_by_hand_is_told_where(
    change: Callable[[dict[str, Any]], object], told: str
) -> None:
    data = whole()
    change(data)
    with pytest.raises(UserError) as caught:
        read_review(json.dumps(data))
    assert told in "\n".join(caught.value.faults)


def test_all_faults_are_told_at_once_but_not_thousands() -> None:
    data = whole()
    for mark in data["marks"]:
        mark["state"], mark["kind"], mark["at"] = "x", "y", "z"
    with pytest.raises(UserError) as caught:
        read_review(json.dumps(data))
    assert len(caught.value.faults) == 21  # 7 marks with 3 faults each
    data["marks"] *= 2
    with pytest.raises(UserError) as caught:
        read_review(json.dumps(data))
    assert caught.value.faults[20] == "and 22 more faults"


@pytest.mark.parametrize(
    ("text", "told"),
    [
        (all_marked(beam()).to_text()[:-200], "the file is cut off or was changed by hand"),
        ("", "not readable as JSON"),
        ("[" * 100_000, "not readable as JSON"),
        ('{"schema": "lineproof review 1", "calc": "B1", "calc": "B2"}', "'calc' stands twice"),
        ("[]", "not a review of schema"),
        ("null", "not a review of schema"),
        (" " * 16_000_001, "larger than 16 MB"),
    ],
    ids=["cut", "empty", "deep", "twice", "list", "null", "large"],
)
def test_a_damaged_file_is_refused_with_a_sentence(text: str, told: str) -> None:
    with pytest.raises(UserError, match=told):
        read_review(text)


# Stale ------------------------------------------------------------------------------------------


def lines_behind(found: Iterable[Stale]) -> dict[str, tuple[str, ...]]:
    """Return for each stale line those that caused it."""
    return {each.mark.line: tuple(cause.line for cause in each.causes) for each in found}


def test_nothing_is_stale_while_nothing_has_changed() -> None:
    assert stale_marks(all_marked(beam()), beam()) == ()


def test_marks_on_what_rests_on_a_changed_input_turn_stale_and_name_it() -> None:
    """By hand: d rests on h, r and the check on d; a rests on A_s and b only."""
    found = stale_marks(all_marked(beam()), beam(h="650 mm"))
    assert lines_behind(found) == {
        "data/h": ("data/h",),
        "flexure/d": ("data/h",),
        "flexure/r": ("data/h",),
        "flexure/enough": ("data/h",),
    }
    assert found[1].why == "data/h was 600 mm, is 650 mm"


def test_two_changed_inputs_are_both_named() -> None:
    found = stale_marks(all_marked(beam()), beam(h="650 mm", b="450 mm"))
    causes = lines_behind(found)
    assert causes["flexure/a"] == ("data/b",)
    assert set(causes["flexure/r"]) == {"data/h", "data/b"}
    why = {each.mark.line: each.why for each in found}["flexure/r"]
    assert why == "data/b was 400 mm, is 450 mm; data/h was 600 mm, is 650 mm"


def test_a_file_without_values_is_read_and_tells_only_what_has_changed() -> None:
    """Written before values were kept: it stays as it was to the byte, until marked again."""
    data = json.loads(all_marked(beam()).to_text())
    del data["records"][0]["values"]
    old = read_review(json.dumps(data))
    assert '"values"' not in old.to_text()
    assert merge(old, old).review.to_text() == old.to_text()
    assert stale_marks(old, beam(h="650 mm"))[1].why == "data/h has changed"
    again = marked(old, beam(), ["data/b"], by="Kei Mori", at="2026-12-02T08:00:00Z")
    assert [dict(each.values) for each in again.records] == [
        {"data/b": "400 mm", "data/h": "600 mm", "data/A_s": "2000 mm2"}
    ]


def test_an_input_read_from_another_row_with_the_same_value_is_told_so() -> None:
    """f_y is 400 MPa for grade 400R as for 400W: "was 400 MPa, is 400 MPa" would puzzle."""
    made = Cause("materials/f_y", "400 MPa", "400 MPa").told("f_y")
    assert made == "f_y is 400 MPa as it was, but from another source"


def test_a_line_written_anew_is_the_cause_of_what_rests_on_it() -> None:
    found = stale_marks(all_marked(beam()), beam(depth="d = 0.88*h"))
    assert lines_behind(found) == {
        "flexure/d": (),
        "flexure/r": ("flexure/d",),
        "flexure/enough": ("flexure/d",),
    }
    assert "was written anew" in found[0].why


def test_a_line_that_is_no_more_is_told() -> None:
    review = all_marked(beam())
    gone = replace(review.marks[0], line="data/cover")
    (found,) = stale_marks(replace(review, marks=(gone,)), beam())
    assert found.gone
    assert found.why == "the line is no longer in the calc"


def test_marks_of_two_issues_name_their_own_causes() -> None:
    """b was marked after it had changed, so only h has changed since."""
    first, second = beam(), beam(b="450 mm")
    review = marked(fresh(), first, ["data/h"], by="Kei Mori", at=AT)
    review = marked(review, second, ["flexure/a", "flexure/r"], by="Kei Mori", at=AT)
    assert {each.digest for each in review.records} == {first.digest, second.digest}
    found = stale_marks(review, beam(b="450 mm", h="650 mm"))
    assert lines_behind(found) == {
        "data/h": ("data/h",),
        "flexure/r": ("data/h",),
    }


def test_a_title_or_a_signature_makes_no_mark_stale() -> None:
    assert stale_marks(all_marked(beam()), beam(prepared="Somebody Else")) == ()


def test_a_snapshot_holds_inputs_only() -> None:
    record = beam()
    assert snapshot(record).inputs == {
        line: record.entries[line]["digest"] for line in ("data/b", "data/h", "data/A_s")
    }


# How a review stands ------------------------------------------------------------------------------


def test_every_line_to_check_is_counted_once() -> None:
    record = beam()
    review = marked(fresh(), record, ALL[:3], by="Kei Mori", at=AT)
    review = marked(review, record, ["flexure/d"], by="Kei Mori", at=AT, state=State.SEEN)
    review = marked(review, record, ["flexure/a"], by="Kei Mori", at=AT, state=State.QUERIED)
    found = standing(review, record)
    assert found.accepted == ("data/b", "data/h", "data/A_s")
    assert (found.seen, found.queried) == (("flexure/d",), ("flexure/a",))
    assert found.unmarked == ("flexure/r", "flexure/enough")
    assert found.to_check == len(ALL)


def test_arithmetic_checked_does_not_accept_an_assumption() -> None:
    record = beam()
    review = marked(fresh(), record, ["data/h"], by="Kei Mori", at=AT, kind=Kind.ARITHMETIC)
    assert "data/h" in standing(review, record).unmarked
    review = marked(review, record, ["data/h"], by="Kei Mori", at=AT, kind=Kind.ASSUMPTION)
    assert standing(review, record).accepted == ("data/h",)
    assert {mark.words for mark in review.marks} == {"arithmetic checked", "assumption accepted"}


def test_a_later_mark_replaces_an_earlier_one_of_the_same_reviewer_only() -> None:
    record, later = beam(), "2026-12-02T08:00:00Z"
    review = marked(fresh(MORI, OTT), record, ALL, by="Kei Mori", at=AT, state=State.QUERIED)
    review = marked(review, record, ALL, by="Kei Mori", at=later)
    assert standing(review, record).accepted == ALL
    review = marked(review, record, ["data/h"], by="Ines Ott", at=AT, state=State.QUERIED)
    found = standing(review, record)
    assert found.queried == ("data/h",)
    assert [each.sentence for each in found.conflicts] == [
        "data/h: assumption accepted by Kei Mori, assumption queried by Ines Ott"
    ]


def test_a_query_stays_one_when_its_line_changes() -> None:
    review = marked(fresh(), beam(), ["flexure/d"], by="Kei Mori", at=AT, state=State.QUERIED)
    assert standing(review, beam(h="650 mm")).queried == ("flexure/d",)


def test_findings_close_and_open_again() -> None:
    early, late = "2026-12-01T10:00:00Z", "2026-12-02T10:00:00Z"
    answer, closing = Said("A. Verdon", early, "It is."), Said("Kei Mori", early)
    steps = [
        FINDING,
        replace(FINDING, responses=(answer,)),
        replace(FINDING, responses=(answer,), back_checks=(Said("Kei Mori", late, "Seen."),)),
        replace(FINDING, responses=(answer,), closed=(closing,)),
        replace(FINDING, responses=(replace(answer, at=late),), closed=(closing,)),
    ]
    assert [step.standing for step in steps] == [
        "open", "answered", "back-checked", "closed", "opened again",
    ]  # fmt: skip
    assert [step.is_closed for step in steps] == [False, False, False, True, False]


# Originator and sign-off ------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("prepared", "name", "initials", "refused"),
    [
        ("A. Verdon", "A. Verdon", "AV", True),
        ("A. Verdon", "a  verdon", "x", True),
        ("A.V.", "Ada Verdon", "AV", True),
        ("A. Verdon and K. Mori", "K. Mori", "KM", True),
        ("A. Verdon, K. Mori", "K Mori", "KM", True),
        ("A. Verdon", "Kei Mori", "KM", False),
        ("A. Verdon", "Anna Valdes", "AV", False),
        ("", "Kei Mori", "KM", False),
        ("Alexandra", "Kei Mori", "KM", False),
    ],
)
def test_the_checker_is_not_the_originator(
    prepared: str, name: str, initials: str, *, refused: bool
) -> None:
    record = beam(prepared=prepared)
    review = marked(fresh(Reviewer(name, initials)), record, ["data/h"], by=name, at=AT)
    faults = refused_reviewers(review, record)
    assert bool(faults) is refused
    assert all("cannot be its checker" in fault and name in fault for fault in faults)


def test_the_originator_may_answer_a_finding() -> None:
    record = beam(prepared="A. Verdon")
    answered = replace(FINDING, responses=(Said("A. Verdon", AT, "Yes."),))
    assert refused_reviewers(replace(fresh(), findings=(answered,)), record) == []
    closed = replace(FINDING, closed=(Said("A. Verdon", AT),))
    assert len(refused_reviewers(replace(fresh(), findings=(closed,)), record)) == 1


def test_the_originator_may_not_sign_off_even_without_a_mark() -> None:
    record = beam(prepared="A. Verdon")
    signed = replace(fresh(), signed=(SignOff(record.digest, "A. Verdon", "2026-12-02"),))
    (fault,) = refused_reviewers(signed, record)
    assert "A. Verdon prepared this calc" in fault


def test_several_originators_are_told_apart() -> None:
    assert originators(beam(prepared="A. Verdon and Andy Sand")) == ("A. Verdon", "Andy Sand")


def test_a_sign_off_names_the_record_and_not_the_signatures_on_it() -> None:
    record = beam()
    signed = sign(all_marked(record), record, "Kei Mori", "2026-12-02")
    (made,) = signed.signed
    assert (made.record, made.by, made.on) == (record.digest, "Kei Mori", "2026-12-02")
    record.data["project"]["issue"]["checked_by"] = "Kei Mori"
    assert beam().digest == record.digest
    assert sign(signed, record, "Kei Mori", "2026-12-02") == signed


def test_signing_is_refused_with_all_that_stands_open() -> None:
    record = beam(h="650 mm")
    review = marked(fresh(), beam(), ALL[:4], by="Kei Mori", at=AT)
    review = marked(review, record, ["flexure/a"], by="Kei Mori", at=AT, state=State.QUERIED)
    with pytest.raises(UserError) as caught:
        sign(replace(review, findings=(FINDING,)), record, "Kei Mori", "2026-12-02")
    assert caught.value.faults == (
        "B1: not signed off: 2 lines not marked: 2.3, 2.4",
        "B1: not signed off: 2 lines marked before a change: 1.2, 2.1",
        "B1: not signed off: 1 line queried: 2.2",
        "B1: not signed off: 1 finding not closed: 1",
    )


@pytest.mark.parametrize(
    ("prepared", "name", "date", "told"),
    [
        ("", "Kei Mori", "2026-12-02", "who prepared it is not known"),
        ("Kei Mori", "Kei Mori", "2026-12-02", "cannot be its checker"),
        ("A. Verdon", "Ines Ott", "2026-12-02", "'Ines Ott' has marked no line of B1; these have"),
        ("A. Verdon", "Kei Mori", "2.12.2026", "'2.12.2026' is no day"),
        ("A. Verdon", "Kei Mori", "2026-02-30", "'2026-02-30' is no day"),
    ],
)
def test_who_signs_and_when_is_looked_at(prepared: str, name: str, date: str, told: str) -> None:
    record = beam(prepared=prepared)
    with pytest.raises(UserError, match=told):
        sign(all_marked(record), record, name, date)


def test_a_review_of_another_calc_is_not_signed() -> None:
    record = beam()
    with pytest.raises(UserError, match="the review is of calc 'B9', not of 'B1'"):
        sign(replace(all_marked(record), calc="B9"), record, "Kei Mori", "2026-12-02")
