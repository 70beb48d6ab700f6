"""Findings of an audit as numbered findings of a review."""

from __future__ import annotations

from dataclasses import replace

from lineproof.audit.data import Audit, Finding
from lineproof.audit.findings import named_clause
from lineproof.audit.review.data import Raised, Review, Reviewer
from lineproof.audit.review.marks import snapshot
from lineproof.audit.review.merge import merge
from lineproof.record import Record
from lineproof.sentences import begun

MOST_EFFECTS = 3
"""Effects told with a finding; the audit report tells them all."""


def with_findings(review: Review, audit: Audit, record: Record, by: Reviewer, at: str) -> Review:
    """Return the review with the findings of an audit that do not stand in it yet.

    ``at`` is the time in UTC, such as "2026-12-01T15:05:33Z". Findings that stand keep their
    numbers, answers and back-checks; one with the same text is not raised again.
    """
    told = {raised.text for raised in review.findings}
    new = [finding for finding in audit.findings if _text(finding) not in told]
    first = max((raised.number for raised in review.findings), default=0) + 1
    lines = record.entries
    made = Review(
        calc=record.calc_id,
        reviewers=(by,),
        records=(snapshot(record),),
        findings=tuple(
            Raised(number, finding.severity, _text(finding), by.name, at,
                   tuple(line for line in finding.ids if line in lines))
            for number, finding in enumerate(new, first)
        ),
    )  # fmt: skip
    return merge(replace(review, calc=record.calc_id), made).review


def _text(finding: Finding) -> str:
    """Return the sentences of a finding: what, the likely slip or what to do, what it matters."""
    effects = [effect.sentence for effect in finding.effects[:MOST_EFFECTS]]
    said = (finding.what, finding.advice, *effects, named_clause(finding.clause))
    text = " ".join(f"{text.strip().rstrip('.')}." for text in said if text.strip())
    return begun(text)
