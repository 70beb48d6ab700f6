"""An HTML package verified: every element against the page printed again from its record.

A browser that saves a page writes other markup for the same page: spaces, tags left open, full
addresses. What an element says, how it is styled and what it draws stay the same.
"""

from __future__ import annotations

import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, field
from html.parser import HTMLParser

from lineproof.audit.review.read import read_review
from lineproof.audit.verify.data import Alteration, Outcome, Outside, Proof, Verification, Where
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
from lineproof.package.reviewed import REVIEW_MIME
from lineproof.record import MIME, Record

_VOID = frozenset({"br", "hr", "img", "input", "link", "meta", "area", "base", "col", "embed",
                   "source", "track", "wbr"})  # fmt: skip
_RECORD = re.compile(rf'<script\s[^<>]*type="{re.escape(MIME)}"', re.IGNORECASE)
_DIGEST = re.compile(r"Record ([0-9a-f]{16}(?: [0-9a-f]{16})*)\Z")
_BEGUN = re.compile(r"\s*<!doctype html", re.IGNORECASE)
_PLAIN = frozenset({"html", "head", "body", "meta", "title"})
_ADDRESSES = frozenset({"href", "src", "xlink:href"})
_AROUND = 24
_PROSE = "prose"
_TOOL = "rv-"
_BESIDE = ("data-mark", "data-trace")
_UNSEEN = frozenset({"tabindex", "xmlns"})


@dataclass
class Block:
    """What stands under one anchor: its texts, and its tags with all that styles or draws them."""

    anchor: str
    texts: list[str] = field(default_factory=list)
    drawn: list[str] = field(default_factory=list)

    @property
    def text(self) -> str:
        """The texts, one space between them."""
        return " ".join(self.texts)


@dataclass
class Page:
    """A page read: its blocks by anchor in order, prose, styles, scripts, texts of reviews.

    ``beside`` are the words that the review tools show beside lines.
    """

    blocks: dict[str, Block] = field(default_factory=dict)
    prose: list[Block] = field(default_factory=list)
    styles: list[str] = field(default_factory=list)
    scripts: list[str] = field(default_factory=list)
    reviews: list[str] = field(default_factory=list)
    beside: list[str] = field(default_factory=list)


def read_page(text: str, *, with_prose: bool = False) -> Page:
    """Read a page; ``with_prose`` takes prose for a part of the page like any other."""
    reader = _Reader(with_prose=with_prose)
    reader.feed(text)
    reader.close()
    return reader.page


class _Reader(HTMLParser):
    """Reads a page into blocks; an element belongs to the nearest anchor above it."""

    def __init__(self, *, with_prose: bool) -> None:
        super().__init__(convert_charrefs=True)
        self.page = Page()
        self.with_prose = with_prose
        self.open: list[tuple[str, Block]] = []
        self.raw: list[str] | None = None
        self.passed = 0

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        """Note an element under its anchor."""
        named = {name: value or "" for name, value in attrs}
        if self.passed or self._is_tool(tag, named):
            self.passed += tag not in _VOID
        elif tag in ("style", "script"):
            self._raw(tag, named)
        else:
            block = self._block(named)
            self.page.beside += [named.pop(name) for name in _BESIDE if name in named]
            if tag not in _PLAIN:
                block.drawn.append(_drawn(tag, named))
            if tag not in _VOID:
                self.open.append((tag, block))

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        """Note an element without content."""
        self.handle_starttag(tag, attrs)
        if tag not in _VOID:
            self.handle_endtag(tag)

    def handle_endtag(self, tag: str) -> None:
        """Close an element, and what was left open inside it."""
        self.raw = None
        if self.passed:
            self.passed -= tag not in _VOID
        elif any(tag == opened for opened, _ in self.open):
            while self.open.pop()[0] != tag:
                pass

    def handle_data(self, data: str) -> None:
        """Note a text."""
        if self.passed:
            return
        if self.raw is not None:
            self.raw[-1] += data
            return
        text = " ".join(data.split())
        if text:
            self._current().texts.append(text)

    def _is_tool(self, tag: str, named: dict[str, str]) -> bool:
        """Tell whether this is a tool of the review page, which stands apart from the print."""
        top = all(opened in ("html", "body") for opened, _ in self.open)
        tool = named.get("id") == "rv" or named.get("class") == "rv-open"
        return tag == "template" or (top and tool)

    def _raw(self, tag: str, named: dict[str, str]) -> None:
        kind = named.get("type", "")
        if tag == "style":
            self.raw = self.page.styles
        elif kind == REVIEW_MIME:
            self.raw = self.page.reviews
        else:
            self.raw = [] if kind == MIME else self.page.scripts
        self.raw.append(named.get("src", ""))

    def _current(self) -> Block:
        return self.open[-1][1] if self.open else self._anchored("")

    def _anchored(self, anchor: str) -> Block:
        return self.page.blocks.setdefault(anchor, Block(anchor))

    def _block(self, named: dict[str, str]) -> Block:
        current = self._current()
        if any(current is prose for prose in self.page.prose):
            return current
        if not self.with_prose and named.get("class") == _PROSE:
            self.page.prose.append(Block(next(reversed(self.page.blocks), "")))
            return self.page.prose[-1]
        anchor = named.get("id") or named.get("aria-labelledby")
        return current if anchor is None else self._anchored(anchor)


def _drawn(tag: str, named: dict[str, str]) -> str:
    """Return a tag with its attributes; of an address within the page only its end."""
    classes = named.get("class", "").split()
    shown = {
        **named,
        "class": " ".join(name for name in classes if not name.startswith(_TOOL)),
    }
    kept = sorted(
        (name, value.rpartition("#")[2] if name in _ADDRESSES and "#" in value else value)
        for name, value in shown.items()
        if (value and name not in _UNSEEN) or name == "hidden"
    )
    return f"{tag} {kept}"


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
        outcome = Outcome.ALTERED if alterations else Outcome.INTACT
    return Verification(
        file=name,
        outcome=outcome,
        proofs=tuple(
            Proof(s.record.calc_id, s.record.digest, len(s.record.entries)) for s in sources
        ),
        alterations=tuple(alterations),
        outside=tuple(compared.outside),
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
        return [*self._blocks(fresh), *self._styled(fresh)]

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
