"""Two reviewers' files into one: nothing is lost, and what does not agree is named."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Iterator
from dataclasses import dataclass, replace

from lineproof.audit.data import Severity
from lineproof.audit.review.data import (
    Mark,
    Raised,
    Review,
    Reviewed,
    Said,
    State,
    in_order,
)
from lineproof.errors import UserError


@dataclass(frozen=True, slots=True)
class Conflict:
    """Two things that do not agree: ``what`` names a line or a finding, ``sentence`` tells."""

    what: str
    sentence: str


@dataclass(frozen=True, slots=True)
class Merged:
    """Two reviews as one, and what in it does not agree."""

    review: Review
    conflicts: tuple[Conflict, ...]


def merge(first: Review, second: Review) -> Merged:
    """Return two reviews of one calc as one; which comes first does not matter.

    A later mark of a reviewer takes the place of his own earlier one of the same line and kind;
    everything else stands. Raises :class:`UserError` for reviews of two calcs.
    """
    if first.calc != second.calc:
        raise UserError(
            f"reviews of two calcs, {first.calc[:40]!r} and {second.calc[:40]!r}, are not merged; "
            "give the reviews of one calc"
        )
    findings, told = _findings((*first.findings, *second.findings))
    made = Review(
        calc=first.calc,
        reviewers=tuple({who.name: who for who in sorted(
            (*first.reviewers, *second.reviewers), key=lambda who: who.initials, reverse=True
        )}.values()),
        records=_records((*first.records, *second.records)),
        findings=findings,
        marks=_marks((*first.marks, *second.marks)),
        signed=tuple(set(first.signed) | set(second.signed)),
    )  # fmt: skip
    told = [*told, *_initials(first, second)]
    return Merged(in_order(made), (*conflicts(made), *told))


def conflicts(review: Review) -> tuple[Conflict, ...]:
    """Return what in a review does not agree: marks of a line, answers to a finding."""
    return (*_mark_conflicts(review), *_finding_conflicts(review))


def _mark_conflicts(review: Review) -> Iterator[Conflict]:
    for line, marks in sorted(review.current().items()):
        by_kind: dict[str, list[Mark]] = defaultdict(list)
        for mark in marks:
            by_kind[mark.kind].append(mark)
        for each in by_kind.values():
            states = {mark.state for mark in each}
            places = [mark.place for mark in each]
            if {State.ACCEPTED, State.QUERIED} <= states or len(set(places)) < len(places):
                told = sorted(f"{mark.words} by {mark.by}{_noted(mark.note)}" for mark in each)
                yield Conflict(line, f"{line}: {', '.join(told)}")


def _noted(note: str) -> str:
    return f" (“{note}”)" if note else ""


def _finding_conflicts(review: Review) -> Iterator[Conflict]:
    for found in sorted(review.findings, key=lambda each: each.number):
        name = f"finding {found.number}"
        if found.is_closed:
            continue
        checked = max((said.at for said in found.back_checks), default="")
        answers = [said for said in found.responses if said.at > checked]
        if len({said.text for said in answers}) > 1:
            told = ", ".join(f"“{said.text}” by {said.by}" for said in sorted(answers, key=_when))
            yield Conflict(name, f"{name}: answered differently: {told}")
        if found.closed:
            by = max(found.closed, key=_when).by
            yield Conflict(name, f"{name}: closed by {by}, but more was written since")


def _initials(first: Review, second: Review) -> Iterator[Conflict]:
    known = {who.name: who.initials for who in first.reviewers}
    for who in second.reviewers:
        other = known.get(who.name, who.initials)
        if other != who.initials:
            told = " and ".join(repr(each) for each in sorted((other, who.initials)))
            yield Conflict(who.name, f"{who.name} has two sets of initials: {told}")


def _when(said: Said) -> tuple[str, str, str]:
    return said.at, said.by, said.text


def _marks(marks: Iterable[Mark]) -> tuple[Mark, ...]:
    """Return each mark once, those left out that their own reviewer has replaced."""
    each_once = set(marks)
    last: dict[tuple[str, str, str], str] = {}
    for mark in each_once:
        last[mark.place] = max(last.get(mark.place, ""), mark.at)
    return tuple(mark for mark in each_once if mark.at == last[mark.place])


def _records(records: Iterable[Reviewed]) -> tuple[Reviewed, ...]:
    """Return each record once; of one digest what both hold of its inputs is kept together."""
    found: dict[str, tuple[dict[str, str], dict[str, str]]] = defaultdict(lambda: ({}, {}))
    for record in records:
        for kept, given in zip(found[record.digest], (record.inputs, record.values), strict=True):
            for line, text in given.items():
                kept[line] = min(kept.get(line, text), text)
    return tuple(Reviewed(digest, *kept) for digest, kept in found.items())


def _findings(findings: Iterable[Raised]) -> tuple[tuple[Raised, ...], list[Conflict]]:
    """Join findings that are the same, and give each a number of its own."""
    same: dict[tuple[str, str, str], list[Raised]] = defaultdict(list)
    for found in findings:
        same[found.origin].append(found)
    joined = sorted(
        (_joined(each) for each in same.values()), key=lambda f: (f.number, f.at, f.by, f.text)
    )
    taken: set[int] = set()
    free = max((found.number for found in joined), default=0)
    numbered, told = [], _severities(same.values())
    for found in joined:
        number = found.number
        if number in taken:
            free = number = free + 1
            told.append(
                Conflict(
                    f"finding {number}",
                    f"finding {found.number} of {found.by} is now finding {number}: its number "
                    "was taken by another",
                )
            )
        taken.add(number)
        numbered.append(replace(found, number=number))
    return tuple(numbered), told


def _joined(same: list[Raised]) -> Raised:
    """Return one finding out of two files: all that was said in either, the graver severity.

    A number once given anew is the greater one, so that it stays.
    """
    gravest = min((found.severity for found in same), key=list(Severity).index)
    return replace(
        same[0],
        number=max(found.number for found in same),
        severity=gravest,
        lines=tuple(sorted({line for found in same for line in found.lines})),
        responses=_all_said(found.responses for found in same),
        back_checks=_all_said(found.back_checks for found in same),
        closed=_all_said(found.closed for found in same),
    )


def _all_said(lists: Iterable[tuple[Said, ...]]) -> tuple[Said, ...]:
    return tuple(sorted({said for each in lists for said in each}, key=_when))


def _severities(groups: Iterable[list[Raised]]) -> list[Conflict]:
    told = []
    for same in groups:
        found = {each.severity for each in same}
        if len(found) > 1:
            number = max(each.number for each in same)
            words = " and ".join(sorted(severity.value for severity in found))
            told.append(
                Conflict(f"finding {number}", f"finding {number} is {words} in the two files")
            )
    return sorted(told, key=lambda conflict: conflict.sentence)
