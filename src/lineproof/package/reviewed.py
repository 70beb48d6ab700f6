"""The review record of a calc as the package prints it: plain data, worded by the audit room."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field, replace

from lineproof.package.facts import Fact, ProjectFacts

REVIEW_MIME = "application/vnd.lineproof.review+json"
"""By which a review is known in an HTML page and in a PDF."""
REVIEW_SUFFIX = ".review.json"

Lines = tuple[tuple[str, str], ...]
"""Id and label of lines; an id that the record does not hold is "", so that nothing links to it."""


@dataclass(frozen=True, slots=True)
class PartTally:
    """How many lines of a part are in which state."""

    label: str
    title: str
    counts: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class PrintedFinding:
    """A finding: number, how grave, where it stands, its text and lines, and what was said."""

    number: str
    severity: str
    standing: str
    text: str
    raised: str
    lines: Lines
    said: tuple[tuple[str, str], ...]


@dataclass(frozen=True, slots=True)
class PrintedStale:
    """Marks made before a change: what has changed, and the lines that were marked before it."""

    why: str
    marks: str
    lines: Lines
    more: str = ""


@dataclass(frozen=True, slots=True)
class PrintedReview:
    """The review of one calc.

    ``text`` is the review's own file, which travels inside the package; ``notes`` are printed
    beside lines, by id; ``checked_by`` is who signed for this very record, "" while anything
    stands open.
    """

    calc: str
    text: str
    summary: str
    reviewers: str
    tallies: tuple[PartTally, ...]
    findings: tuple[PrintedFinding, ...]
    stale: tuple[PrintedStale, ...]
    conflicts: tuple[str, ...]
    signed: tuple[str, ...]
    checked_by: str = ""
    notes: Mapping[str, tuple[str, ...]] = field(default_factory=dict, hash=False)
    anchor: str = ""


TALLY_HEADS = ("Lines", "Accepted", "Seen", "Queried", "Stale", "Not marked")
"""What the counts of a part are, in their order."""


def checked_by(facts: ProjectFacts, reviews: Sequence[PrintedReview | None]) -> ProjectFacts:
    """Return the facts with the checker's name on the cover where every calc is signed off.

    What the project's file says stands in any case.
    """
    names = [review.checked_by if review is not None else "" for review in reviews]
    if not names or not all(names):
        return facts
    told = "; ".join(dict.fromkeys(names))
    signatures = tuple(
        Fact(fact.label, told) if fact.label == "Checked by" and not fact.value else fact
        for fact in facts.signatures
    )
    return replace(facts, signatures=signatures)
