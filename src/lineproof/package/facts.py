"""Project facts of the cover, read from the project's TOML content; a missing one stays empty."""

from __future__ import annotations

import datetime as dt
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from functools import partial
from typing import Any

from lineproof.errors import UserError
from lineproof.standards.codes import code_pair

STATUSES = ("preliminary", "for review", "for permit", "for construction")
FINAL_STATUSES = ("for permit", "for construction")
PAPERS = {"letter": "us-letter", "us-letter": "us-letter", "a4": "a4"}
_NO_DATE = dt.date(2000, 1, 1)
_PLACE = ("grid", "level")


@dataclass(frozen=True, slots=True)
class Fact:
    """A label and its value; an empty value prints as a line to fill by hand."""

    label: str
    value: str


@dataclass(frozen=True, slots=True)
class Drawing:
    """A drawing of the project with its revision."""

    number: str
    revision: str
    title: str


@dataclass(frozen=True, slots=True)
class Revision:
    """An issue of the package."""

    letter: str
    date: str
    description: str


@dataclass(frozen=True, slots=True)
class ProjectFacts:
    """Everything the cover and the running heads say about the project."""

    name: str
    facts: tuple[Fact, ...]
    signatures: tuple[Fact, ...]
    drawings: tuple[Drawing, ...]
    revisions: tuple[Revision, ...]
    criteria: tuple[Fact, ...]
    status: str
    superseded: str
    revision: str
    date: dt.date
    date_text: str
    paper: str


def project_facts(
    project: Mapping[str, Any], codes: Mapping[str, Any], calcs: Sequence[str] = ()
) -> ProjectFacts:
    """Read the facts of a project and of the calculations named.

    Raises :class:`UserError` for a wrong date, status or paper size, or codes that are no pair.
    """
    facts = _Tables(project)
    date_text = facts.text("issue", "date")
    revisions = tuple(
        Revision(_text(r, "letter"), _text(r, "date"), _text(r, "description"))
        for r in facts.rows("revisions")
    )
    return ProjectFacts(
        name=facts.text("project", "name"),
        facts=(*_cover_facts(facts, codes), *_locations(facts, calcs)),
        signatures=(
            Fact("Prepared by", facts.text("issue", "prepared_by")),
            Fact("Checked by", facts.text("issue", "checked_by")),
        ),
        drawings=tuple(
            Drawing(_text(d, "number"), _text(d, "revision"), _text(d, "title"))
            for d in facts.rows("drawings")
        ),
        revisions=revisions,
        criteria=_criteria(facts, codes),
        status=_status(facts.text("issue", "status")),
        superseded=facts.text("issue", "superseded"),
        revision=revision_of(project),
        date=_date(date_text),
        date_text=date_text,
        paper=_paper(facts.text("paper", "size")),
    )


def revision_of(project: Mapping[str, Any]) -> str:
    """Return the revision that the cover names: that of the issue, else the last one listed.

    >>> revision_of({"revisions": [{"letter": "A"}, {"letter": "B"}]})
    'B'
    """
    facts = _Tables(project)
    letters = [_text(row, "letter") for row in facts.rows("revisions")]
    return facts.text("issue", "revision") or (letters[-1] if letters else "")


class _Tables:
    """Reads texts out of nested tables, whatever is missing or of another kind."""

    def __init__(self, project: Mapping[str, Any]) -> None:
        self.project = project

    def table(self, name: str) -> Mapping[str, Any]:
        found = self.project.get(name, {})
        return found if isinstance(found, Mapping) else {}

    def text(self, table: str, key: str) -> str:
        return _text(self.table(table), key)

    def rows(self, name: str) -> list[Mapping[str, Any]]:
        found = self.project.get(name, [])
        rows = found if isinstance(found, list) else [found]
        return [row for row in rows if isinstance(row, Mapping)]


def _text(table: Mapping[str, Any], key: str) -> str:
    value = table.get(key, "")
    if isinstance(value, list):
        return ", ".join(str(item) for item in value)
    return "" if value is None else str(value)


def _cover_facts(facts: _Tables, codes: Mapping[str, Any]) -> tuple[Fact, ...]:
    return (
        Fact("Project number", facts.text("project", "number")),
        Fact("Address", facts.text("project", "address")),
        Fact("Client", facts.text("project", "client")),
        Fact("Firm", facts.text("firm", "name")),
        Fact("Permit to practice", facts.text("firm", "permit")),
        Fact("Codes", _pair(facts, codes)),
        Fact("Amendments", facts.text("codes", "amendments")),
        Fact("Importance category", facts.text("building", "importance")),
    )


def _locations(facts: _Tables, calcs: Sequence[str]) -> tuple[Fact, ...]:
    """Say where the calculations stand: one by grid and level, several a line each.

    A calculation without a place has its line all the same, to be filled in by hand.
    """
    rows = {_text(row, "calc"): row for row in facts.rows("locations")}
    if len(calcs) > 1 and rows:
        told = {calc: rows.get(calc, {}) for calc in calcs}
        return tuple(
            Fact(f"Location of {calc}", "; ".join(filter(None, map(partial(_text, row), _PLACE))))
            for calc, row in told.items()
        )
    place = rows.get(calcs[0], {}) if rows and calcs else facts.table("location")
    return tuple(Fact(key.capitalize(), _text(place, key)) for key in _PLACE)


def _pair(facts: _Tables, codes: Mapping[str, Any]) -> str:
    """Return the locked pair; on a sheet of own lines alone no beam would refuse another."""
    pair = _text(codes, "pair") or facts.text("codes", "pair")
    return code_pair(pair).name if pair else ""


def _criteria(facts: _Tables, codes: Mapping[str, Any]) -> tuple[Fact, ...]:
    """Collect the criteria that exist: codes, importance, and the project's own table."""
    own = facts.table("criteria")
    stated = [
        Fact("Code pair", _pair(facts, codes)),
        Fact("Loads", _text(codes, "building")),
        Fact("Concrete", _text(codes, "concrete")),
        Fact("Amendments", facts.text("codes", "amendments")),
        Fact("Importance category", facts.text("building", "importance")),
        *(Fact(key.replace("_", " ").capitalize(), _text(own, key)) for key in own),
    ]
    return tuple(fact for fact in stated if fact.value)


def _date(text: str) -> dt.date:
    """Return the issue date, the only date that enters the files; a fixed one stands for none."""
    if not text:
        return _NO_DATE
    try:
        date = dt.date.fromisoformat(text[:10])
    except ValueError:
        raise UserError(
            f"issue.date: {text[:40]!r} is not a date; write it like '2026-11-20'"
        ) from None
    if not 1970 <= date.year <= 2200:  # noqa: PLR2004 - what a document date can hold
        raise UserError(f"issue.date: {text[:40]!r} is out of range; write it like '2026-11-20'")
    return date


def _status(status: str) -> str:
    if status and status not in STATUSES:
        known = ", ".join(repr(word) for word in STATUSES)
        raise UserError(f"issue.status: {status[:40]!r} is not known; write one of {known}")
    return status


def _paper(size: str) -> str:
    paper = PAPERS.get((size or "letter").strip().lower())
    if paper is None:
        raise UserError(f"paper.size: {size[:40]!r} is not printed; write 'letter' or 'A4'")
    return paper
