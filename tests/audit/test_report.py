"""The audit report: a package of notes and tables, safe to open, true to the audit."""

from __future__ import annotations

import csv
import io
import math
from dataclasses import replace

import pytest
from tests.audit.hand import beam, typed

from lineproof.audit.claims.judge import judge
from lineproof.audit.data import Audit, Effect, Finding, Interval, Judged, Severity, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.report import audit_report, report_files, report_record
from lineproof.audit.slips.search import find_slips
from lineproof.audit.verify.verification import Outcome, verify
from lineproof.errors import UserError
from lineproof.record import recompute

HOSTILE = '=HYPERLINK("http://example.org")'


@pytest.fixture(scope="module")
def audit() -> Audit:
    """M_r of the beam by hand is 206.6; 220 is claimed, and the check claims to hold at 180/220.

    180/220 = 0.818, 180/206.636 = 0.871.
    """
    record = beam()
    graph = Graph(record)
    claims = [typed(graph, "beam/d", "539"), typed(graph, "strength/M_r", "220")]
    effect = Effect(
        check="strength/strength", claimed=0.818, right=0.871, holds_as_claimed=True, holds=True,
        sentence="moment, from 0.82 to 0.87",
    )  # fmt: skip
    findings = (
        Finding("claims", Severity.MAJOR, "M_r does not follow", ("strength/M_r",), "10.1",
                "Work it again.", (effect,)),
        Finding("missing", Severity.CRITICAL, HOSTILE),
    )  # fmt: skip
    return Audit("H1", record.digest, judge(graph, claims, find_slips), findings)


def texts(audit: Audit) -> dict[str, list[str]]:
    """Return all texts of the report by part."""
    found: dict[str, list[str]] = {}
    for part in report_record(audit, beam()).parts:
        said = found.setdefault(part["key"], [part["title"]])
        for entry in part["entries"]:
            said += [entry["title"], entry.get("text", "")]
            said += [cell for row in entry.get("rows", []) for cell in row]
    return found


def test_findings_are_numbered_the_gravest_first_with_line_clause_and_effect(audit: Audit) -> None:
    found = texts(audit)

    assert list(found) == [
        "compared", "findings-critical", "findings-major", "judged", "not-claimed",
    ]  # fmt: skip
    assert "Finding 1" in found["findings-critical"]
    label = beam().entries["strength/M_r"]["label"]
    major = found["findings-major"]
    assert f"Finding 2, line {label}" in major
    assert any(text.startswith("Clause 10.1. Work it again.") for text in major)
    assert major[-4:] == ["Span 1: strength", "0.82", "0.87", "still holds"]


def test_judged_lines_show_claim_what_follows_what_is_right_and_verdict(audit: Audit) -> None:
    """206.636 from exact inputs; d of 539 mm stands for 538.5 to 539.5, or 206.45 to 206.86."""
    rows = [
        row
        for part in report_record(audit, beam()).parts
        if part["key"] == "judged"
        for row in part["entries"][0]["rows"]
    ]

    assert [row[-1] for row in rows] == ["agrees", "origin"]
    assert rows[1][2] == "220 kN·m"
    assert rows[1][4] == "206.6 kN·m"
    low, high = rows[1][3].removesuffix(" kN·m").split(" to ")
    assert (low, high) == ("206.5", "206.9")


def test_an_exact_input_is_shown_as_such_and_a_claim_with_its_page() -> None:
    """n_b is 4, not 4.000; the depth is 600 mm."""
    record = beam()
    graph = Graph(record)
    claims = [typed(graph, "given/h", "600"), typed(graph, "given/n_b", "4")]
    claims[0] = replace(claims[0], where="p. 3")
    made = Audit("H1", record.digest, judge(graph, claims, find_slips), ())
    judged = next(p for p in report_record(made, record).parts if p["key"] == "judged")
    shown = [row[2:5] for row in judged["entries"][0]["rows"]]
    assert shown == [["600 mm (p. 3)", "600 mm", "600 mm"], ["4", "4", "4"]]


def test_every_line_that_was_not_claimed_is_named(audit: Audit) -> None:
    """The beam has 15 givens, 5 lines and a check; two lines are claimed; a check is no value."""
    rows = [
        row
        for part in report_record(audit, beam()).parts
        if part["key"] == "not-claimed"
        for row in part["entries"][0]["rows"]
    ]

    assert rows[0] == ["Given", "15", "1.1 to 1.15"]
    assert sum(int(row[1]) for row in rows) == 15 + 5 - 2


def test_nothing_found_says_so() -> None:
    record = beam()

    made = report_record(Audit("H1", record.digest), record)

    assert made.entries["findings/none"]["text"] == "Nothing was found."
    assert recompute(made) == []


def test_report_names_what_it_is_who_made_it_and_its_own_cautions(audit: Audit) -> None:
    package = audit_report(audit, beam(), checker="P. N.", date="2026-12-01")

    assert package.words.kind == "Audit report of a structural calculation"
    assert package.facts.signatures[0].value == "P. N."
    assert package.facts.date_text == "2026-12-01"
    assert "proves no calculation right" in package.words.cautions[0]
    assert package.failures == ()


def test_a_wrong_date_is_refused(audit: Audit) -> None:
    with pytest.raises(UserError, match="is not a date"):
        audit_report(audit, beam(), date="yesterday")


def test_files_are_pdf_html_and_tables_that_start_no_formula(audit: Audit) -> None:
    files = report_files(audit, beam(), "H1-audit")

    assert list(files) == [
        "H1-audit.pdf", "H1-audit.html", "H1-audit-judged.csv", "H1-audit-findings.csv",
    ]  # fmt: skip
    for name, content in files.items():
        if name.endswith(".csv"):
            cells = [c for row in csv.reader(io.StringIO(content.decode("utf-8-sig"))) for c in row]
            assert cells
            assert not any(cell.startswith(("=", "+", "@", "\t")) for cell in cells)
    findings = files["H1-audit-findings.csv"].decode("utf-8-sig")
    assert "'=HYPERLINK" in findings


def test_the_printed_report_can_be_verified_and_holds_user_text_as_text(audit: Audit) -> None:
    files = report_files(audit, beam(), "a")

    assert verify(files["a.pdf"], "a.pdf").outcome is Outcome.INTACT
    assert verify(files["a.html"], "a.html").outcome is Outcome.INTACT
    assert "Audit report of a structural calculation" in files["a.html"].decode()


def test_the_page_of_a_report_offers_no_review_of_lines_that_it_has_not(audit: Audit) -> None:
    page = report_files(audit, beam(), "a")["a.html"].decode()

    assert "script-src 'none'" in page
    assert 'class="rv-open"' not in page
    assert 'type="module"' not in page


def test_claims_that_lead_to_no_number_are_told_without_one() -> None:
    """A depth of 1e-90 mm gives no finite number in places; the report prints all the same."""
    record = beam()
    graph = Graph(record)
    claim = typed(graph, "strength/M_r", "207")
    endless = Judged(claim.id, Verdict.ORIGIN, claim, Interval(math.nan, math.inf), 206.6e6)
    made = report_record(Audit("H1", record.digest, (endless,), ()), record)
    rows = next(p for p in made.parts if p["key"] == "judged")["entries"][0]["rows"]
    assert rows[0][3] == "no value"
    assert graph["strength/M_r"].number_text(math.inf) == "no value"
