"""A review worded for the package: tallies, findings, what is stale and why, sign-offs, notes."""

from __future__ import annotations

from collections.abc import Iterable

from lineproof.audit.review.data import Mark, Raised, Review, Said, SignOff, State, in_order
from lineproof.audit.review.marks import Stale, Standing, standing
from lineproof.audit.review.merge import Conflict
from lineproof.package.reviewed import (
    Lines,
    PartTally,
    PrintedFinding,
    PrintedReview,
    PrintedStale,
)
from lineproof.record import Record
from lineproof.sentences import begun, counted

MOST_LINES = 60
"""Lines that a change has made stale are named up to here; of more only the number is told."""
MOST_CHANGES = 25
"""Changes listed one by one, those that touch the most lines."""
_DAY = 10
"""Characters of a day: of a time only the day is printed."""


def printed_review(review: Review, record: Record) -> PrintedReview:
    """Return what the package prints of a review; the record stays as it is."""
    review = in_order(review)
    words = _Words(review, record)
    return PrintedReview(
        calc=record.calc_id,
        text=review.to_text(),
        summary=words.summary(),
        reviewers=words.reviewers(),
        tallies=tuple(words.tallies()),
        findings=tuple(words.finding(each) for each in review.findings),
        stale=tuple(words.stale()),
        conflicts=tuple(words.conflict(each) for each in words.stands.conflicts),
        signed=tuple(words.signed(each) for each in review.signed),
        checked_by=words.checked_by(),
        notes=words.notes(),
    )


class _Words:
    """Words a review against a record."""

    def __init__(self, review: Review, record: Record) -> None:
        self.review = review
        self.record = record
        self.stands: Standing = standing(review, record)

    def summary(self) -> str:
        stands = self.stands
        told = [
            f"{stands.to_check} lines to check",
            f"{len(stands.accepted)} accepted",
            f"{len(stands.seen)} seen",
            f"{len(stands.queried)} queried",
            f"{len(stands.stale)} marked before a change",
            f"{len(stands.unmarked)} not marked",
        ]
        return f"{'; '.join(told)}."

    def reviewers(self) -> str:
        named = (
            f"{who.name} ({who.initials})" if who.initials else who.name
            for who in self.review.reviewers
        )  # fmt: skip
        return ", ".join(named)

    def tallies(self) -> Iterable[PartTally]:
        stands = self.stands
        lists = [set(each) for each in (
            stands.accepted, stands.seen, stands.queried, stands.stale, stands.unmarked
        )]  # fmt: skip
        for part in self.record.parts:
            ids = {entry["id"] for entry in part["entries"]}
            counts = [len(ids & each) for each in lists]
            if sum(counts):
                shown = (sum(counts), *counts)
                yield PartTally(part["label"], part["title"], tuple(str(n or "–") for n in shown))

    def lines(self, ids: Iterable[str]) -> Lines:
        entries = self.record.entries
        return tuple(
            (line, entries[line].get("label") or entries[line].get("title") or line)
            if line in entries
            else ("", f"{line} (no longer in the calc)")
            for line in ids
        )

    def finding(self, found: Raised) -> PrintedFinding:
        said = [
            *(("Answer", each) for each in found.responses),
            *(("Back-check", each) for each in found.back_checks),
            *(("Closed", each) for each in found.closed),
        ]
        said.sort(key=lambda pair: pair[1].at)
        return PrintedFinding(
            number=str(found.number),
            severity=found.severity.value,
            standing=found.standing,
            text=found.text,
            raised=f"{self.review.initials(found.by)}, {found.at[:_DAY]}",
            lines=self.lines(found.lines),
            said=tuple((what, _said(each)) for what, each in said),
        )

    def stale(self) -> Iterable[PrintedStale]:
        """Give what has changed, each with the lines marked before it, the most lines first."""
        groups: dict[str, list[Stale]] = {}
        for each in self.stands.stale_marks:
            groups.setdefault(self.labelled(each), []).append(each)
        ordered = sorted(groups.items(), key=lambda item: (-len(item[1]), item[0]))
        yield from (self.changed(why, marks) for why, marks in ordered[:MOST_CHANGES])
        rest = [each for _, marks in ordered[MOST_CHANGES:] for each in marks]
        if rest:
            yield self.changed("Other changes, several to a line.", rest)

    def changed(self, why: str, stale: Iterable[Stale]) -> PrintedStale:
        """Word a change and the marks that are older than it."""
        marks = [each.mark for each in stale]
        ids = list(dict.fromkeys(mark.line for mark in marks))
        by = sorted({self.review.initials(mark.by) for mark in marks})
        return PrintedStale(
            why,
            f"{counted(len(marks), 'mark')} by {', '.join(by)}",
            self.lines(ids[:MOST_LINES]),
            f" and {len(ids) - MOST_LINES} more" if len(ids) > MOST_LINES else "",
        )

    def labelled(self, stale: Stale) -> str:
        """Say what has changed with the labels of its lines, where there are few of them."""
        why = stale.why
        if stale.gone or not 0 < len(stale.causes) <= MOST_LINES // 10:
            return f"{begun(why)}."
        entries = self.record.entries
        named = "; ".join(
            cause.told(
                f"{entries[cause.line].get('title') or cause.line} "
                f"({entries[cause.line].get('label') or cause.line})"
            )
            for cause in stale.causes
        )
        return f"{begun(named)}."

    def conflict(self, each: Conflict) -> str:
        """Say what does not agree, a line by its number and title."""
        entry = self.record.entries.get(each.what)
        if entry is None:
            return each.sentence
        name = f"{entry['label']} {entry.get('title') or ''}".strip() or each.what
        return f"{name}: {each.sentence.removeprefix(f'{each.what}: ')}"

    def signed(self, each: SignOff) -> str:
        told = f"Signed off by {each.by} on {each.on} for the record {each.record}"
        if each.record != self.record.digest:
            return (
                f"{told}, not for this one: it has changed since, and the sign-off does not hold."
            )
        if self.stands.open_items:
            return f"{told}, which is this one; since then this stands open: " + "; ".join(
                self.stands.open_items
            )
        return f"{told}, which is this one."

    def checked_by(self) -> str:
        if self.stands.open_items:
            return ""
        holding = [each for each in self.review.signed if each.record == self.record.digest]
        return ", ".join(f"{each.by}, {each.on}" for each in holding)

    def notes(self) -> dict[str, tuple[str, ...]]:
        """Return what stands beside lines: queries, comments and findings, not every tick."""
        found: dict[str, list[str]] = {}
        for line, marks in self.review.current().items():
            for mark in marks:
                if line in self.record.entries and (mark.note or mark.state is State.QUERIED):
                    found.setdefault(line, []).append(self.mark(mark))
        for each in self.review.findings:
            told = f"finding {each.number}, {each.severity.value}, {each.standing}: {each.text}"
            for line in dict.fromkeys(each.lines):
                if line in self.record.entries:
                    found.setdefault(line, []).append(told)
        return {line: tuple(notes) for line, notes in found.items()}

    def mark(self, mark: Mark) -> str:
        changed = self.record.entries[mark.line]["digest"] != mark.digest
        since = "; the line has changed since" if changed else ""
        note = f": {mark.note}" if mark.note else ""
        return f"{self.review.initials(mark.by)}, {mark.at[:_DAY]}, {mark.words}{since}{note}"


def _said(said: Said) -> str:
    text = f": {said.text}" if said.text else ""
    return f"{said.by}, {said.at[:_DAY]}{text}"
