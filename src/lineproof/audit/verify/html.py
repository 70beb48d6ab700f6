"""An HTML package verified: every element against the page printed again from its record.

A browser that saves a page writes other markup for the same page: spaces, tags left open, full
addresses. What an element says, how it is styled and what it draws stay the same.
"""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence

from lineproof.audit.review.read import read_review
from lineproof.audit.verify.data import Alteration, Outcome, Outside, Proof, Verification, Where
from lineproof.audit.verify.html_page import Page, read_page
from lineproof.audit.verify.record import (
    NOT_PRINTED,
    Source,
    altered_records,
    differing_records,
    not_printed,
    printed_again,
)
from lineproof.errors import UserError
from lineproof.package import build_package, records_in_html, to_html
from lineproof.record import MIME, Record

_RECORD = re.compile(rf'<script\s[^<>]*type="{re.escape(MIME)}"', re.IGNORECASE)
_DIGEST = re.compile(r"Record ([0-9a-f]{16}(?: [0-9a-f]{16})*)\Z")
_BEGUN = re.compile(r"\s*<!doctype html", re.IGNORECASE)
_AROUND = 24


def verify_html(text: str, name: str, against: Sequence[Source] = ()) -> Verification:
    """Verify an HTML package; raises :class:`UserError` for one whose record cannot be read."""
    records = [Record.from_data(d) for d in records_in_html(text)] if _RECORD.search(text) else []
    known = {source.record.calc_id: source.walk for source in against}
    given = read_page(text)
    reviews = _reviews(given)
    sources = [
        Source(r, known.get(r.calc_id), reviews.get(r.calc_id, "")) for r in records
    ] or list(against)
    said = _DIGEST.search(given.blocks[""].text) if "" in given.blocks else None
    if not records and said is None:
        if _BEGUN.match(text) and "</html" not in text.lower():
            raise UserError(
                f"{name}: this page is cut off, its end is missing; give the whole file"
            )
        return Verification(name, Outcome.NOT_OURS)
    alterations = altered_records(records)
    if records and against:
        alterations += differing_records(records, against)
    compared = _Compared(text, given, sources)
    if sources:
        alterations += compared.alterations()
    if not records:
        outcome = Outcome.STRIPPED
    else:
        outcome = Outcome.HANDLED if given.remarks else Outcome.INTACT
        outcome = Outcome.ALTERED if alterations else outcome
    return Verification(
        file=name,
        outcome=outcome,
        proofs=tuple(
            Proof(s.record.calc_id, s.record.digest, len(s.record.entries)) for s in sources
        ),
        alterations=tuple(alterations),
        outside=tuple(compared.outside),
        remarks=tuple(given.remarks),
    )


def _reviews(page: Page) -> dict[str, str]:
    """Return the texts of the reviews in a page by calculation; what is no review is left."""
    found = {}
    for text in page.reviews:
        try:
            found[read_review(text).calc] = text
        except UserError:
            continue
    return found


class _Compared:
    """A page beside the page printed again."""

    def __init__(self, text: str, given: Page, sources: Sequence[Source]) -> None:
        self.sources = sources
        self.with_prose = bool(sources) and all(s.walk is not None for s in sources)
        self.given = read_page(text, with_prose=True) if self.with_prose else given
        self.outside = [
            Outside(block.text, after=self._label(block.anchor)[1]) for block in self.given.prose
        ]
        self.outside += [Outside(text) for text in self.given.beside if text]

    def alterations(self) -> list[Alteration]:
        """Return everything in which the page departs from its records."""
        try:
            printed = to_html(printed_again(self.sources, walks=self._walks()))
        except NOT_PRINTED as error:
            return [not_printed(error, self.sources)]
        fresh = read_page(printed, with_prose=self.with_prose)
        return [*self._blocks(fresh), *self._styled(fresh), *self._led(fresh)]

    def _walks(self) -> list[list[tuple[str, str]] | None]:
        """Return the parts of each calculation in the order in which the page shows them."""
        prefixes = _prefixes([source.record for source in self.sources])
        walks: list[list[tuple[str, str]] | None] = []
        for source, prefix in zip(self.sources, prefixes, strict=True):
            start = f"{prefix}part-"
            keys = [a[len(start) :] for a in self.given.blocks if a.startswith(start)]
            parts = {part["key"] for part in source.record.parts}
            whole = set(keys) == parts and len(keys) == len(parts)
            walks.append([("part", key) for key in keys] if whole else None)
        return walks

    def _blocks(self, fresh: Page) -> Iterator[Alteration]:
        ours, theirs = fresh.blocks, self.given.blocks
        for anchor in {**ours, **theirs}:
            own, other = ours.get(anchor), theirs.get(anchor)
            if other is None:
                yield self._altered(anchor, "is missing", Where.PRINT)
            elif own is None:
                what = "stands here without being in the record"
                yield self._altered(anchor, what, Where.PRINT, found=other.text)
            elif own.texts != other.texts and own.text != other.text:
                recorded, found = _apart(own.text, other.text)
                yield self._altered(anchor, "the print differs", Where.PRINT, recorded, found)
            elif own.drawn != other.drawn:
                recorded, found = _apart("; ".join(own.drawn), "; ".join(other.drawn))
                what = "is shown otherwise than the record prints it"
                yield self._altered(anchor, what, Where.DRAWN, recorded, found)
        if [a for a in ours if a in theirs] != [a for a in theirs if a in ours]:
            yield Alteration(Where.PRINT, "the elements of the page stand in another order")

    def _styled(self, fresh: Page) -> Iterator[Alteration]:
        for what, ours, theirs in (
            ("style sheet", fresh.styles, self.given.styles),
            ("script", fresh.scripts, self.given.scripts),
        ):
            if [_dense(text) for text in ours] != [_dense(text) for text in theirs]:
                yield Alteration(
                    Where.DRAWN,
                    f"the {what} of the page is not the one that is printed here: what a browser "
                    "shows may not be what stands in the page; if another version of lineproof "
                    "printed it, verify it with that version, or issue it again",
                )

    def _led(self, fresh: Page) -> Iterator[Alteration]:
        """Tell of links that leave the page: where a browser has saved it, all name one place."""
        away = self.given.leads - fresh.leads
        if len(away) > 1 or (away and "" in self.given.leads):
            what = f"a link of the page leads to another one: {min(away)}"
            yield Alteration(Where.DRAWN, what)

    def _altered(
        self, anchor: str, what: str, where: Where, recorded: str = "", found: str = ""
    ) -> Alteration:
        calc, label, entry_id = self._label(anchor)
        if not label and not entry_id:
            what = f"{anchor or 'cover'}: {what}"
        return Alteration(where, what, calc, label, entry_id, 0, recorded, found)

    def _label(self, anchor: str) -> tuple[str, str, str]:
        """Return calculation, printed number and id of the line that an anchor names."""
        prefixes = _prefixes([source.record for source in self.sources])
        for source, prefix in zip(self.sources, prefixes, strict=True):
            entry_id = anchor.removeprefix(prefix).removeprefix("front/")
            entry = source.record.entries.get(entry_id)
            if entry is not None and anchor.startswith(prefix):
                return source.record.calc_id, str(entry.get("label", "")), entry_id
        return "", "", ""


def _prefixes(records: Sequence[Record]) -> list[str]:
    """Return what stands before the anchors of each calculation, as the package has it."""
    if len(records) > 1:
        return [calc.anchor for calc in build_package(records).calcs]
    return [""] * len(records)  # none for a page without its record


def _dense(text: str) -> str:
    return "".join(text.split())


def _apart(own: str, other: str) -> tuple[str, str]:
    """Return where two texts first differ, with some letters around."""
    start = next(
        (n for n, (a, b) in enumerate(zip(own, other, strict=False)) if a != b),
        min(len(own), len(other)),
    )
    most = min(len(own), len(other)) - start
    end = next((n for n in range(most) if own[-1 - n] != other[-1 - n]), most)
    low = max(start - _AROUND, 0)
    return (
        own[low : len(own) - end + _AROUND].strip(),
        other[low : len(other) - end + _AROUND].strip(),
    )
