"""A review out of its file: every field looked at, all faults at once, nothing run."""

from __future__ import annotations

import datetime as dt
import json
import re
from collections.abc import Callable, Mapping
from typing import Any, TypeVar

from lineproof.audit.data import Severity
from lineproof.audit.review.data import (
    LISTS,
    SCHEMA,
    Kind,
    Mark,
    Raised,
    Review,
    Reviewed,
    Reviewer,
    Said,
    SignOff,
    State,
)
from lineproof.errors import FaultList, UserError
from lineproof.record.plain_data import shown

LARGEST_REVIEW = 16_000_000
"""Characters of a review that is still read."""
MOST_ITEMS = 100_000
LONGEST_TEXT = 4000
LONGEST_NAME = 120
MOST_FAULTS = 20
_DIGEST = re.compile(r"[0-9a-f]{16}\Z")
_TIME = re.compile(r"\d{4}-\d\d-\d\dT\d\d:\d\d:\d\dZ\Z", re.ASCII)
_DAY = re.compile(r"\d{4}-\d\d-\d\d\Z", re.ASCII)

Item = TypeVar("Item")
Fields = Mapping[str, Any]


def read_review(text: str) -> Review:
    """Read a review; raises :class:`UserError` with everything that is wrong with it."""
    data = _json(text)
    if not isinstance(data, dict) or data.get("schema") != SCHEMA:
        told = shown(data.get("schema")) if isinstance(data, dict) else shown(data)
        raise UserError(
            f"review: not a review of schema {SCHEMA!r} but {told}; give the file that the review "
            "page saved"
        )
    reader = _Reader()
    made = reader.review(data)
    faults = reader.faults.faults
    if len(faults) > MOST_FAULTS:
        raise UserError([*faults[:MOST_FAULTS], f"and {len(faults) - MOST_FAULTS} more faults"])
    reader.faults.raise_if_any()
    return made


def _json(text: str) -> Any:
    if len(text) > LARGEST_REVIEW:
        raise UserError(f"review: larger than {LARGEST_REVIEW // 1_000_000} MB; not read")
    try:
        return json.loads(text.removeprefix("\ufeff"), object_pairs_hook=_once)
    except (ValueError, RecursionError) as error:
        raise UserError(
            f"review: not readable as JSON ({str(error)[:80]}); the file is cut off or was changed "
            "by hand: save it again from the review page"
        ) from None


def _once(pairs: list[tuple[str, Any]]) -> dict[str, Any]:
    made = dict(pairs)
    if len(made) != len(pairs):
        names = [name for name, _ in pairs]
        twice = next(name for name in names if names.count(name) > 1)
        raise ValueError(f"{twice[:40]!r} stands twice")
    return made


class _Reader:
    """Reads the lists of a review; ``place`` names in faults where it is."""

    def __init__(self) -> None:
        self.faults = FaultList()
        self.place = "review"

    def review(self, data: Fields) -> Review:
        self.only(data, ("schema", "calc", *LISTS))
        calc = self.text(data, "calc", LONGEST_NAME, need=True)
        made = Review(
            calc=calc,
            reviewers=self.items(data, "reviewers", "reviewer", self.reviewer),
            records=self.items(data, "records", "record", self.reviewed),
            findings=self.items(data, "findings", "finding", self.finding),
            marks=self.items(data, "marks", "mark", self.mark),
            signed=self.items(data, "signed", "sign-off", self.sign_off),
        )
        self.place = "review"
        self.check_names(made)
        return made

    def check_names(self, made: Review) -> None:
        """Refuse names, records and numbers that point to nothing, or to two things."""
        self.twice([who.name for who in made.reviewers], "reviewer")
        self.twice([record.digest for record in made.records], "record")
        self.twice([str(found.number) for found in made.findings], "finding")
        names = {who.name for who in made.reviewers}
        digests = {record.digest for record in made.records}
        for number, mark in enumerate(made.marks, 1):
            if mark.by and mark.by not in names:
                self.add(f"mark {number}: {mark.by[:40]!r} is not among the reviewers; add the "
                         "name with its initials")  # fmt: skip
            if mark.record and mark.record not in digests:
                self.add(f"mark {number}: record {mark.record!r} is not among the records; save "
                         "the review again from the review page")  # fmt: skip

    def twice(self, values: list[str], what: str) -> None:
        seen: set[str] = set()
        for value in values:
            if value in seen:
                self.add(f"{what} {value[:40]!r} stands twice; give each once")
            seen.add(value)

    def items(
        self, data: Fields, name: str, what: str, read: Callable[[Fields], Item]
    ) -> tuple[Item, ...]:
        found = data.get(name, [])
        if not isinstance(found, list):
            self.add(f"{name} is {shown(found)}, not a list")
            return ()
        if len(found) > MOST_ITEMS:
            self.add(f"{name}: more than {MOST_ITEMS} items; not read")
            return ()
        made = []
        outer = self.place
        for number, item in enumerate(found, 1):
            self.place = f"{outer}: {what} {number}"
            if isinstance(item, dict):
                made.append(read(item))
            else:
                self.add(f"is {shown(item)}, not an object with fields")
        self.place = outer
        return tuple(made)

    def reviewer(self, row: Fields) -> Reviewer:
        self.only(row, ("name", "initials"))
        return Reviewer(
            self.text(row, "name", LONGEST_NAME, need=True), self.text(row, "initials", 8)
        )

    def reviewed(self, row: Fields) -> Reviewed:
        self.only(row, ("digest", "inputs", "values"))
        inputs = row.get("inputs", {})
        if not isinstance(inputs, dict) or not all(
            isinstance(digest, str) and _DIGEST.match(digest) and len(line) <= LONGEST_TEXT
            for line, digest in inputs.items()
        ):
            self.add("inputs: not a digest of 16 letters and digits for each line; save the "
                     "review again from the review page")  # fmt: skip
            inputs = {}
        return Reviewed(self.digest(row, "digest"), inputs, self.values(row))

    def values(self, row: Fields) -> Mapping[str, str]:
        """Return the values of inputs by line; files of before they were kept have none."""
        values = row.get("values", {})
        if not isinstance(values, dict) or len(values) > MOST_ITEMS:
            self.add(f"values: {shown(values)} is no text for each line; save the review "
                     "again from the review page")  # fmt: skip
            return {}
        return {
            self.text({"values": line}, "values", LONGEST_TEXT): self.text(
                {"values": value}, "values", LONGEST_TEXT
            )
            for line, value in values.items()
        }

    def finding(self, row: Fields) -> Raised:
        self.only(row, ("number", "severity", "text", "by", "at", "lines", "responses",
                        "back_checks", "closed"))  # fmt: skip
        number = row.get("number")
        if not isinstance(number, int) or isinstance(number, bool) or not 1 <= number <= MOST_ITEMS:
            self.add(f"number {shown(number)} is not a whole number from 1; write such as 3")
            number = 1
        return Raised(
            number=number,
            severity=Severity(self.one_of(row, "severity", [each.value for each in Severity])),
            text=self.text(row, "text", LONGEST_TEXT, need=True),
            by=self.text(row, "by", LONGEST_NAME, need=True),
            at=self.time(row),
            lines=self.texts(row, "lines"),
            responses=self.items(row, "responses", "response", self.said),
            back_checks=self.items(row, "back_checks", "back-check", self.said),
            closed=self.items(row, "closed", "closing", self.said),
        )

    def said(self, row: Fields) -> Said:
        self.only(row, ("by", "at", "text"))
        by = self.text(row, "by", LONGEST_NAME, need=True)
        return Said(by, self.time(row), self.text(row, "text", LONGEST_TEXT))

    def mark(self, row: Fields) -> Mark:
        self.only(row, ("line", "kind", "state", "by", "at", "digest", "record", "note"))
        return Mark(
            line=self.text(row, "line", LONGEST_TEXT, need=True),
            kind=Kind(self.one_of(row, "kind", [each.value for each in Kind])),
            state=State(self.one_of(row, "state", [each.value for each in State])),
            by=self.text(row, "by", LONGEST_NAME, need=True),
            at=self.time(row),
            digest=self.digest(row, "digest"),
            record=self.digest(row, "record"),
            note=self.text(row, "note", LONGEST_TEXT),
        )

    def sign_off(self, row: Fields) -> SignOff:
        self.only(row, ("record", "by", "on"))
        on = row.get("on")
        if not is_day(on):
            self.add(f"on: {shown(on)} is no day; write such as '2026-12-01'")
        return SignOff(
            self.digest(row, "record"), self.text(row, "by", LONGEST_NAME, need=True), str(on)
        )

    # Fields -------------------------------------------------------------------------------------

    def add(self, fault: str) -> None:
        self.faults.add(f"{self.place}: {fault}")

    def only(self, row: Fields, known: tuple[str, ...]) -> None:
        for name in row:
            if name not in known:
                self.add(f"{name[:40]!r} is not a field; there are {', '.join(known)}")

    def text(self, row: Fields, name: str, longest: int, *, need: bool = False) -> str:
        value = row.get(name, "")
        if not isinstance(value, str) or any("\ud800" <= c <= "\udfff" for c in value):
            self.add(f"{name}: {shown(value)} is no text")
            return ""
        if len(value) > longest:
            self.add(f"{name}: longer than {longest} characters; shorten it")
            return value[:longest]
        if need and not value.strip():
            self.add(f"{name} is missing or empty; write it")
        return value

    def texts(self, row: Fields, name: str) -> tuple[str, ...]:
        found = row.get(name, [])
        if not isinstance(found, list) or len(found) > MOST_ITEMS:
            self.add(f"{name} is {shown(found)}, not a list of lines")
            return ()
        return tuple(self.text({name: value}, name, LONGEST_TEXT, need=True) for value in found)

    def digest(self, row: Fields, name: str) -> str:
        value = row.get(name)
        if isinstance(value, str) and _DIGEST.match(value):
            return value
        self.add(f"{name}: {shown(value)} is no digest of 16 letters and digits; save the review "
                 "again from the review page")  # fmt: skip
        return ""

    def time(self, row: Fields) -> str:
        value = row.get("at")
        if isinstance(value, str) and _TIME.match(value) and _exists(value):
            return value
        self.add(f"at: {shown(value)} is no time; write such as '2026-12-01T15:05:33Z'")
        return ""

    def one_of(self, row: Fields, name: str, known: list[str]) -> str:
        value = row.get(name)
        if isinstance(value, str) and value in known:
            return value
        self.add(f"{name}: {shown(value)} is not known; write one of {', '.join(known)}")
        return known[0]


def is_day(value: object) -> bool:
    """Tell whether a value is a day that exists, such as "2026-12-01"."""
    return isinstance(value, str) and _DAY.match(value) is not None and _exists(value)


def _exists(text: str) -> bool:
    try:
        dt.datetime.fromisoformat(text)
    except ValueError:
        return False
    return True
