"""Marks against the calc as it is now: what is stale and why, what stands open, the sign-off."""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, replace
from typing import Any

from lineproof.audit.review.data import (
    Kind,
    Mark,
    Review,
    Reviewed,
    SignOff,
    State,
    kind_for,
)
from lineproof.audit.review.merge import Conflict, conflicts
from lineproof.audit.review.read import is_day
from lineproof.errors import UserError
from lineproof.record import Record
from lineproof.record.entry import CRITERIA, FOUND, GIVEN, LOOKUP, VALUES
from lineproof.sentences import counted, listed
from lineproof.typeset.values import is_number, told

INPUTS = (GIVEN, LOOKUP, FOUND)
TO_CHECK = (*VALUES, *CRITERIA)
"""The kinds of line that must be marked before a calc is signed off."""
MOST_NAMED = 12
_SHORTEST_NAME = 5
_PARTED = re.compile(r"[,;/&]|\band\b")


@dataclass(frozen=True, slots=True)
class Cause:
    """A changed line behind which nothing else has changed, as it was when marked and as it is.

    Both texts are empty for a line that is no input, and where the review holds no values.
    """

    line: str
    was: str = ""
    now: str = ""

    def told(self, name: str) -> str:
        """Say what has changed.

        >>> Cause("data/f_c", "30 MPa", "35 MPa").told("f_c"), Cause("data/f_c").told("f_c")
        ('f_c was 30 MPa, is 35 MPa', 'f_c has changed')
        """
        if not self.was:
            return f"{name} has changed"
        if self.was == self.now:
            return f"{name} is {self.now} as it was, but from another source"
        return f"{name} was {value_told(self.was)}, is {value_told(self.now)}"


def value_told(text: str) -> str:
    """Return the value of an input as a sentence tells it.

    >>> value_told("-12.5 kN.m"), value_told("35 deg"), value_told("6 ft 3 in")
    ('−12.5 kN·m', '35°', '6 ft 3 in')
    """
    number, _, unit = text.partition(" ")
    return told(number, unit) if is_number(number) else text


@dataclass(frozen=True, slots=True)
class Stale:
    """A mark of a line that has changed since: what caused it, ``gone`` if the line is no more.

    Without causes, the line itself was written differently, or one above that nobody marked.
    """

    mark: Mark
    causes: tuple[Cause, ...] = ()
    gone: bool = False

    @property
    def why(self) -> str:
        """Say what has changed."""
        if self.gone:
            return "the line is no longer in the calc"
        if not self.causes:
            return "the line itself, or one above it that nobody had marked, was written anew"
        named = [cause.told(cause.line) for cause in self.causes[:MOST_NAMED]]
        more = f"; and {len(self.causes) - MOST_NAMED} more" * (len(self.causes) > MOST_NAMED)
        return "; ".join(named) + more


def snapshot(record: Record) -> Reviewed:
    """Return what a review keeps of the record that was reviewed."""
    inputs = {i: e for i, e in record.entries.items() if e["kind"] in INPUTS}
    return Reviewed(
        record.digest,
        {line: entry["digest"] for line, entry in inputs.items()},
        {line: _value(entry) for line, entry in inputs.items()},
    )


def _value(entry: Mapping[str, Any]) -> str:
    """Return the value of an input as typed, else as printed, its unit in ASCII."""
    printed = entry["printed"]
    return str(entry.get("typed") or f"{printed['result']} {printed['unit']}".rstrip())


def marked(
    review: Review,
    record: Record,
    lines: Iterable[str],
    *,
    by: str,
    at: str,
    state: State = State.ACCEPTED,
    kind: Kind | None = None,
    note: str = "",
) -> Review:
    """Return the review with lines of the record marked; the kind follows from the line."""
    made = tuple(
        Mark(
            line, kind or kind_for(record.entries[line]["kind"]), state, by, at,
            record.entries[line]["digest"], record.digest, note,
        )
        for line in lines
    )  # fmt: skip
    known = any(each.digest == record.digest and each.values for each in review.records)
    others = tuple(each for each in review.records if each.digest != record.digest)
    records = review.records if known else (*others, snapshot(record))
    return replace(review, marks=(*review.marks, *made), records=records)


def stale_marks(review: Review, record: Record) -> tuple[Stale, ...]:
    """Return the marks whose line has changed since, in the order of the record, with causes."""
    now = {entry_id: entry["digest"] for entry_id, entry in record.entries.items()}
    current = [mark for marks in review.current().values() for mark in marks]
    known: dict[str, dict[str, str]] = {each.digest: dict(each.inputs) for each in review.records}
    values = {each.digest: each.values for each in review.records}
    for mark in current:
        known.setdefault(mark.record, {})[mark.line] = mark.digest
    roots = {
        digest: _roots(record, {i for i, old in then.items() if now.get(i, old) != old})
        for digest, then in known.items()
    }
    found = [
        _stale(mark, record, roots[mark.record], values.get(mark.record, {}))
        for mark in current
        if now.get(mark.line) != mark.digest
    ]
    order = {entry_id: place for place, entry_id in enumerate(now)}
    return tuple(sorted(found, key=lambda each: order.get(each.mark.line, len(order))))


def _stale(
    mark: Mark, record: Record, roots: Mapping[str, tuple[str, ...]], values: Mapping[str, str]
) -> Stale:
    entry = record.entries.get(mark.line)
    if entry is None:
        return Stale(mark, gone=True)
    lines = roots.get(mark.line, ())
    itself = lines == (mark.line,) and entry["kind"] not in INPUTS
    return Stale(mark, () if itself else tuple(_cause(line, record, values) for line in lines))


def _cause(line: str, record: Record, values: Mapping[str, str]) -> Cause:
    entry = record.entries[line]
    was = values.get(line, "")
    return Cause(line, was, _value(entry)) if was and entry["kind"] in INPUTS else Cause(line)


def _roots(record: Record, changed: set[str]) -> dict[str, tuple[str, ...]]:
    """Return for each line the changed lines it rests on behind which nothing else has changed.

    A changed line with none above it is its own root.
    """
    found: dict[str, tuple[str, ...]] = {}
    if not changed:
        return found
    entries = record.entries
    for start in entries:
        waiting = [start]
        while waiting:  # not by recursion: a calculation may be one long chain
            line = waiting[-1]
            args = [arg for arg in entries[line].get("args", {}).values() if arg in entries]
            missing = [arg for arg in args if arg not in found]
            if missing:
                waiting.extend(missing)
                continue
            above = dict.fromkeys(root for arg in args for root in found[arg])
            found[line] = tuple(above) or ((line,) if line in changed else ())
            waiting.pop()
    return found


@dataclass(frozen=True, slots=True)
class Standing:
    """How a review stands against the calc as it is now; lines by id, in order of the record.

    Every line to be checked is in one of ``accepted``, ``seen``, ``queried``, ``stale`` and
    ``unmarked``; a query stays one also where its line has changed.
    """

    accepted: tuple[str, ...]
    seen: tuple[str, ...]
    queried: tuple[str, ...]
    stale: tuple[str, ...]
    unmarked: tuple[str, ...]
    stale_marks: tuple[Stale, ...]
    open_findings: tuple[int, ...]
    conflicts: tuple[Conflict, ...]
    labels: Mapping[str, str]
    """The number that a line has in print, by id; the id itself where it has none."""

    @property
    def to_check(self) -> int:
        """How many lines there are to check."""
        lists = (self.accepted, self.seen, self.queried, self.stale, self.unmarked)
        return sum(len(lines) for lines in lists)

    @property
    def open_items(self) -> tuple[str, ...]:
        """Say what keeps the calc from being signed off, lines by their numbers in print."""
        told = [
            f"{counted(len(lines), 'line')} {what}: "
            f"{listed((self.labels[line] for line in lines), MOST_NAMED)}"
            for lines, what in (
                (self.unmarked, "not marked"),
                (self.stale, "marked before a change"),
                (self.queried, "queried"),
            )
            if lines
        ]
        if self.open_findings:
            numbers = [str(number) for number in self.open_findings]
            told.append(
                f"{counted(len(numbers), 'finding')} not closed: {listed(numbers, MOST_NAMED)}"
            )
        return (*told, *(f"conflict: {self._numbered(each)}" for each in self.conflicts))

    def _numbered(self, each: Conflict) -> str:
        if each.what not in self.labels:
            return each.sentence
        return f"{self.labels[each.what]}: {each.sentence.removeprefix(f'{each.what}: ')}"


def standing(review: Review, record: Record) -> Standing:
    """Return how a review stands against a record."""
    current = review.current()
    states: dict[str, list[str]] = {
        name: [] for name in ("accepted", "seen", "queried", "stale", "unmarked")
    }
    for entry_id, entry in record.entries.items():
        if entry["kind"] in TO_CHECK:
            need = kind_for(entry["kind"])
            states[_state(current.get(entry_id, []), need, entry["digest"])].append(entry_id)
    return Standing(
        **{name: tuple(lines) for name, lines in states.items()},
        stale_marks=stale_marks(review, record),
        open_findings=tuple(f.number for f in review.findings if not f.is_closed),
        conflicts=conflicts(review),
        labels={line: entry["label"] or line for line, entry in record.entries.items()},
    )


def _state(marks: Iterable[Mark], need: Kind, digest: str) -> str:
    marks = list(marks)
    if any(mark.state is State.QUERIED for mark in marks):
        return "queried"
    for state in (State.ACCEPTED, State.SEEN):
        if any(m.state is state and m.kind is need and m.digest == digest for m in marks):
            return str(state.value)
    return "stale" if any(mark.digest != digest for mark in marks) else "unmarked"


def originators(record: Record) -> tuple[str, ...]:
    """Return who prepared the calc, as the project's TOML file says."""
    issue = record.data["project"].get("issue", {})
    given = issue.get("prepared_by", "") if isinstance(issue, Mapping) else ""
    names = given if isinstance(given, list) else [given, record.data["calc"].get("originator", "")]
    found = (part.strip() for name in names for part in _PARTED.split(str(name)))
    return tuple(dict.fromkeys(name for name in found if name))


def is_same_person(name: str, initials: str, originator: str) -> bool:
    """Tell whether a reviewer is the originator: by name, or by initials where only these stand.

    >>> is_same_person("A. Verdon", "AV", "a verdon"), is_same_person("Ada Verdon", "AV", "A.V.")
    (True, True)
    >>> is_same_person("Kei Mori", "KM", "A. Verdon")
    False
    """
    own = _letters(originator)
    return own in {_letters(name), _letters(initials) if len(own) < _SHORTEST_NAME else ""} - {""}


def _letters(name: str) -> str:
    plain = unicodedata.normalize("NFKC", name).casefold()
    return "".join(letter for letter in plain if letter.isalnum())


def refused_reviewers(review: Review, record: Record) -> list[str]:
    """Return a sentence for each who has marked, raised or closed what he prepared himself."""
    acting = {mark.by for mark in review.marks} | {each.by for each in review.signed}
    for found in review.findings:
        acting |= {found.by, *(said.by for said in (*found.back_checks, *found.closed))}
    initials = {who.name: who.initials for who in review.reviewers}
    return [
        f"{review.calc}: {name} prepared this calc (issue.prepared_by is {originator!r} in the "
        "project's TOML file) and cannot be its checker; let another engineer review it"
        for name in sorted(acting)
        for originator in originators(record)
        if is_same_person(name, initials.get(name, ""), originator)
    ]


def sign(review: Review, record: Record, name: str, date: str) -> Review:
    """Return the review signed off for the record as it is, by the digest of the record.

    Raises :class:`UserError` with everything that stands open.
    """
    faults = [*_other_calc(review, record), *_signer(review, record, name)]
    if not is_day(date):
        faults.append(f"date: {date[:40]!r} is no day; write such as '2026-12-01'")
    faults += [f"{review.calc}: not signed off: {each}" for each in
               standing(review, record).open_items]  # fmt: skip
    if faults:
        raise UserError(faults)
    made = SignOff(record.digest, name, date)
    return replace(review, signed=(*(each for each in review.signed if each != made), made))


def _other_calc(review: Review, record: Record) -> list[str]:
    if review.calc == record.calc_id:
        return []
    return [f"the review is of calc {review.calc[:40]!r}, not of {record.calc_id[:40]!r}"]


def _signer(review: Review, record: Record, name: str) -> list[str]:
    faults = refused_reviewers(review, record)
    if not originators(record):
        faults.append(
            f"{record.calc_id}: who prepared it is not known, so its checker could be the same "
            "person; write issue.prepared_by in the project's TOML file and issue with --update"
        )
    by = sorted({mark.by for mark in review.marks})
    if name not in by:
        told = f"these have: {', '.join(by)}" if by else "nobody has"
        faults.append(f"{name[:60]!r} has marked no line of {review.calc}; {told}")
    return faults
