"""The review record: marks, findings and sign-offs of one calc, as a small JSON beside it.

Nothing in it is ever run; text stays text. The review page of the HTML package reads and writes
the very same form.
"""

from __future__ import annotations

import json
from collections.abc import Iterable, Mapping
from dataclasses import Field, dataclass, field, fields
from enum import StrEnum
from typing import Any

from lineproof.audit.data import Severity
from lineproof.record.entry import GIVEN, LOOKUP, NOTE

SCHEMA = "lineproof review 1"
"""How a review says what it is; another number is another form."""


class State(StrEnum):
    """How far a reviewer is with a line."""

    SEEN = "seen"
    QUERIED = "queried"
    ACCEPTED = "accepted"


class Kind(StrEnum):
    """What of a line was looked at: its arithmetic, or what it takes for granted."""

    ARITHMETIC = "arithmetic"
    ASSUMPTION = "assumption"


WORDS: Mapping[tuple[Kind, State], str] = {
    (Kind.ARITHMETIC, State.SEEN): "arithmetic seen",
    (Kind.ARITHMETIC, State.QUERIED): "arithmetic queried",
    (Kind.ARITHMETIC, State.ACCEPTED): "arithmetic checked",
    (Kind.ASSUMPTION, State.SEEN): "assumption seen",
    (Kind.ASSUMPTION, State.QUERIED): "assumption queried",
    (Kind.ASSUMPTION, State.ACCEPTED): "assumption accepted",
}
"""What a mark says, in words."""


def kind_for(entry_kind: str) -> Kind:
    """Return what there is to be checked of an entry: typed and looked-up values are assumptions.

    >>> kind_for("given").value, kind_for("line").value
    ('assumption', 'arithmetic')
    """
    return Kind.ASSUMPTION if entry_kind in (GIVEN, LOOKUP, NOTE) else Kind.ARITHMETIC


@dataclass(frozen=True, slots=True)
class Reviewer:
    """Who reviews: name in full and initials."""

    name: str
    initials: str


@dataclass(frozen=True, slots=True)
class Mark:
    """What a reviewer says of a line.

    ``digest`` is that of the line when it was marked, ``record`` that of the whole record; ``at``
    is the time in UTC, such as "2026-12-01T15:05:33Z".
    """

    line: str
    kind: Kind
    state: State
    by: str
    at: str
    digest: str
    record: str
    note: str = ""

    @property
    def place(self) -> tuple[str, str, str]:
        """A later mark of the same place takes the place of an earlier one."""
        return self.line, self.kind.value, self.by

    @property
    def words(self) -> str:
        """What it says, in words."""
        return WORDS[self.kind, self.state]


@dataclass(frozen=True, slots=True)
class Said:
    """What somebody wrote about a finding."""

    by: str
    at: str
    text: str = ""


@dataclass(frozen=True, slots=True)
class Raised:
    """A numbered finding of a review: text, lines, what was answered, back-checked and closed."""

    number: int
    severity: Severity
    text: str
    by: str
    at: str
    lines: tuple[str, ...] = ()
    responses: tuple[Said, ...] = ()
    back_checks: tuple[Said, ...] = ()
    closed: tuple[Said, ...] = ()

    @property
    def origin(self) -> tuple[str, str, str]:
        """By which a finding is the same in two files, whatever its number."""
        return self.by, self.at, self.text

    @property
    def is_closed(self) -> bool:
        """Tell whether it was closed and nothing was said since."""
        last = max((said.at for said in (*self.responses, *self.back_checks)), default="")
        return bool(self.closed) and max(said.at for said in self.closed) >= last

    @property
    def standing(self) -> str:
        """Where it stands, in one word or two."""
        if self.is_closed:
            return "closed"
        if self.closed:
            return "opened again"
        if self.back_checks and self._last(self.back_checks) >= self._last(self.responses):
            return "back-checked"
        return "answered" if self.responses else "open"

    @staticmethod
    def _last(said: Iterable[Said]) -> str:
        return max((each.at for each in said), default="")


@dataclass(frozen=True, slots=True)
class SignOff:
    """A signature: the digest of the record it is for, who and on which day."""

    record: str
    by: str
    on: str


@dataclass(frozen=True, slots=True)
class Reviewed:
    """A record that was reviewed: its digest, and of each of its inputs by id digest and value.

    Inputs are what is typed, looked up or found; by these a stale mark names its cause, and what
    that was ("30 MPa", unit in ASCII). Files of before values were kept hold none.
    """

    digest: str
    inputs: Mapping[str, str] = field(hash=False)
    values: Mapping[str, str] = field(default_factory=dict, hash=False)


@dataclass(frozen=True, slots=True)
class Review:
    """All that was reviewed of one calc."""

    calc: str
    reviewers: tuple[Reviewer, ...] = ()
    records: tuple[Reviewed, ...] = ()
    findings: tuple[Raised, ...] = ()
    marks: tuple[Mark, ...] = ()
    signed: tuple[SignOff, ...] = ()

    def to_text(self) -> str:
        """Return the review as JSON text, one item a line, the same for the same review."""
        ordered = in_order(self)
        lists = {
            name: ",\n".join(_compact(_plain(item)) for item in getattr(ordered, name))
            for name in LISTS
        }
        body = "".join(
            f',\n"{name}": [\n{text}\n]' if text else f',\n"{name}": []'
            for name, text in lists.items()
        )
        return f'{{\n"schema": {_compact(SCHEMA)},\n"calc": {_compact(self.calc)}{body}\n}}\n'

    def initials(self, name: str) -> str:
        """Return the initials of a reviewer; his name where two have the same, or he has none."""
        own = next((who.initials for who in self.reviewers if who.name == name), "")
        shared = sum(who.initials == own for who in self.reviewers) > 1
        return own if own and not shared else name

    def current(self) -> dict[str, list[Mark]]:
        """Return the last mark of each reviewer and kind by line; two of one time both stand."""
        last: dict[tuple[str, str, str], str] = {}
        for mark in self.marks:
            last[mark.place] = max(last.get(mark.place, ""), mark.at)
        found: dict[str, list[Mark]] = {}
        for mark in self.marks:
            if mark.at == last[mark.place]:
                found.setdefault(mark.line, []).append(mark)
        return found


LISTS = ("reviewers", "records", "findings", "marks", "signed")
"""The lists of a review, in the order of its file."""


def in_order(review: Review) -> Review:
    """Return the review with everything in the order of its file."""
    return Review(
        calc=review.calc,
        reviewers=tuple(sorted(review.reviewers, key=lambda who: (who.name, who.initials))),
        records=tuple(sorted(review.records, key=lambda record: record.digest)),
        findings=tuple(sorted(review.findings, key=lambda found: found.number)),
        marks=tuple(sorted(review.marks, key=mark_order)),
        signed=tuple(sorted(review.signed, key=lambda each: (each.on, each.by, each.record))),
    )


def mark_order(mark: Mark) -> tuple[str, ...]:
    """Return what marks are sorted by: line, kind, reviewer, time, then all the rest."""
    return (*mark.place, mark.at, mark.state.value, mark.note, mark.digest, mark.record)


def _plain(item: object) -> Any:
    """Return frozen data as plain data; fields that stand at their empty default are left out."""
    if isinstance(item, tuple):
        return [_plain(each) for each in item]
    if isinstance(item, Mapping):
        return {key: item[key] for key in sorted(item)}
    if isinstance(item, StrEnum):
        return item.value
    if isinstance(item, str | int):
        return item
    return {
        spec.name: _plain(value)
        for spec in fields(item)  # type: ignore[arg-type]
        if (value := getattr(item, spec.name)) not in ("", ()) and not _is_default(spec, value)
    }


def _is_default(spec: Field[Any], value: object) -> bool:
    return spec.default_factory is dict and not value


def _compact(value: object) -> str:
    return json.dumps(value, ensure_ascii=False, separators=(",", ":"))
