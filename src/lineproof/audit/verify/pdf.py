"""A PDF package verified: its records, its pages, and what others have done to it."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from typing import Any

from lineproof.audit.verify.cut import cut_pages, lines_under
from lineproof.audit.verify.data import Alteration, Outcome, Outside, Proof, Verification, Where
from lineproof.audit.verify.file import END, Box, File
from lineproof.audit.verify.page import Document, Keys, Kind, Mark, Zone
from lineproof.audit.verify.printed import compare_pages
from lineproof.audit.verify.record import (
    NOT_PRINTED,
    Source,
    altered_records,
    differing_records,
    lines_of,
    not_printed,
    printed_again,
)
from lineproof.errors import UserError
from lineproof.package import to_pdf
from lineproof.package.read import silent
from lineproof.record import Record
from lineproof.sentences import listed

_FOOTER = re.compile(r"Record ([0-9a-f]{16}[0-9a-f ]*…?)\Z")
ANOTHER_VERSION = (
    "most lines stand otherwise than they are printed here: if another version of lineproof "
    "printed this package, verify it with that version, or issue it again"
)
_MOST_LINES = 6
_MARKED = b"/Subtype/Footer/Type/Pagination"


def verify_pdf(content: bytes, name: str, against: Sequence[Source] = ()) -> Verification:
    """Verify a PDF; raises :class:`UserError` for one that cannot be read."""
    with silent():
        file = File(content)
        found = _Checking(file, against).verification(name)
        ends = [end.end() for end in END.finditer(content)]
        if found.outcome is Outcome.ALTERED and len(ends) > 1:
            found = _issued_intact(found, content[: ends[0]], name, against)
    if most_differ(found):
        return replace(found, remarks=(*found.remarks, ANOTHER_VERSION))
    return found


def most_differ(found: Verification) -> bool:
    """Tell whether most lines stand otherwise: so does a layout of another version, no forgery."""
    shown = (Where.PRINT, Where.DRAWN)
    lines = {(a.calc, a.id) for a in found.alterations if a.id and a.where in shown}
    return 2 * len(lines) > sum(proof.lines for proof in found.proofs) > 0


def _issued_intact(
    found: Verification, first: bytes, name: str, against: Sequence[Source]
) -> Verification:
    """Say so where what was altered was appended to a file that was intact."""
    try:
        issued = _Checking(File(first), against).verification(name)
    except UserError:
        return found
    if not issued.intact:
        return found
    told = f"the first {len(first)} bytes are the package as issued, intact: the change is appended"
    return replace(found, remarks=(*found.remarks, told))


@dataclass
class _Own:
    """The pages of one package: records named in its footers, numbers of its pages from 0."""

    footer: str
    pages: list[int] = field(default_factory=list)
    marks: list[Mark] = field(default_factory=list)
    sources: list[Source] = field(default_factory=list)

    def add(self, page: int, marks: Sequence[Mark]) -> None:
        """Add a page; its marks count pages within the package."""
        self.marks += [mark._replace(page=len(self.pages)) for mark in marks]
        self.pages.append(page)

    def take(self, other: _Own) -> None:
        """Take over the pages of another one, all in the order of the file."""
        of_page: dict[int, list[Mark]] = {page: [] for page in sorted(self.pages + other.pages)}
        for own in (self, other):
            for mark in own.marks:
                of_page[own.pages[mark.page]].append(mark)
        self.pages, self.marks = [], []
        for page, marks in of_page.items():
            self.add(page, marks)

    def counted(self) -> tuple[set[int], set[str]]:
        """Return the numbers that the pages bear, and of how many pages they say to be."""
        heads = [m for m in self.marks if m.zone is Zone.RUNNING and m.number]
        return {m.number for m in heads}, {m.text.rpartition(" ")[2] for m in heads}


def _over(owns: Sequence[_Own], page: int, box: Box) -> str:
    """Name the lines that something laid over a page of the file touches; "" for none."""
    own = next((own for own in owns if page in own.pages), None)
    if own is None:
        return ""
    lines = lines_under(box, own.pages.index(page), own.marks, lines_of(own.sources))
    return f", over line {listed(lines, _MOST_LINES)}" if lines else ""


def _fits(page: _Own, home: _Own) -> bool:
    """Tell whether pages with an altered footer are those that a package lacks."""
    (own, own_total), (known, total) = page.counted(), home.counted()
    return bool(own) and not own & known and own_total == total


class _Checking:
    """Everything that is looked at in one file."""

    def __init__(self, file: File, against: Sequence[Source]) -> None:
        self.file, self.against = file, against
        self.keys = Keys()
        self.printed: dict[tuple[str, ...], bytes] = {}
        self.alterations: list[Alteration] = []
        self.outside: list[Outside] = []
        self.remarks: list[str] = []

    def verification(self, name: str) -> Verification:
        """Return what is found."""
        records = self.file.records()
        given = {source.record.calc_id: source for source in self.against}
        sources = [
            Source(
                record,
                given[record.calc_id].walk if record.calc_id in given else None,
                self.file.review(record.calc_id),
            )
            for record in records
        ]
        stripped = not sources
        self.alterations += altered_records(records)
        if self.against and sources:
            self.alterations += differing_records(records, self.against)
        owns: list[_Own] = []
        if not self._same_bytes(sources):
            owns = self._owned([s.record for s in sources])
            self._match(owns, sources or list(self.against))
            for own in owns:
                self._compare(own)
        own_pages = sum(len(own.pages) for own in owns) if owns else len(self.file.pages)
        if not sources and not owns:
            return self._without_our_pages(name)
        self._others(owns)
        shown = sources or [source for own in owns for source in own.sources]
        return Verification(
            file=name,
            outcome=self._outcome(stripped=stripped),
            proofs=tuple(
                Proof(s.record.calc_id, s.record.digest, len(s.record.entries)) for s in shown
            ),
            alterations=tuple(self.alterations),
            outside=tuple(self.outside),
            remarks=tuple(self.remarks),
            pages=len(self.file.pages),
            own_pages=own_pages,
        )

    def _without_our_pages(self, name: str) -> Verification:
        """Tell a file of others from a package that another program has drawn again."""
        pages, digest = len(self.file.pages), self.file.digest_redrawn()
        if not digest:
            return Verification(name, Outcome.NOT_OURS, pages=pages)
        known = any(source.record.digest == digest for source in self.against)
        named = "the record given" if known else f"record {digest}"
        what = (
            f"the pages name {named} and have been drawn again by another program: not a mark of "
            "them can be compared; ask for the file as issued"
        )
        altered = (Alteration(Where.DRAWN, what),)
        return Verification(name, Outcome.STRIPPED, alterations=altered, pages=pages)

    def _outcome(self, *, stripped: bool) -> Outcome:
        if stripped:
            return Outcome.STRIPPED
        if self.alterations:
            return Outcome.ALTERED
        return Outcome.HANDLED if self.remarks else Outcome.INTACT

    def _same_bytes(self, sources: Sequence[Source]) -> bool:
        """Tell whether the file is what our printer gives for its records, byte for byte."""
        if not sources or not self.file.pages:
            return False
        return self._printed(sources, self.file.pages[0]) == self.file.content

    def _printed(self, sources: Sequence[Source], page: Any) -> bytes:
        """Return the package printed again on the paper of a page; nothing where it cannot be."""
        paper = self.file.paper(page)
        key = (paper, *(source.record.digest for source in sources))
        if key not in self.printed:
            try:
                self.printed[key] = to_pdf(printed_again(sources, paper))
            except NOT_PRINTED as error:
                self.alterations.append(not_printed(error, sources))
                self.printed[key] = b""
        return self.printed[key]

    # -- pages ---------------------------------------------------------------------------------

    def _owned(self, records: Sequence[Record]) -> list[_Own]:
        """Gather the pages that bear our footer by what it says."""
        document = Document(self.keys)
        digests = {record.digest for record in (*records, *(s.record for s in self.against))}
        groups: dict[str, _Own] = {}
        for number, page in enumerate(self.file.pages):
            footer, marks = self._read(document, page, number, digests)
            if not footer:
                continue
            own = groups.setdefault(footer, _Own(footer))
            own.add(number, marks)
        return list(groups.values())

    def _read(
        self, document: Document, page: Any, number: int, digests: set[str]
    ) -> tuple[str, list[Mark]]:
        """Return what the footer of a page says and its marks; "" for a page of others."""
        try:
            contents = page.get_contents()
            content = b"" if contents is None else contents.get_data()
            if _MARKED in content:
                marks = document.marks(page, number)
                footers = (_FOOTER.match(m.text) for m in marks if m.zone is Zone.RUNNING)
                footer = next((found[1] for found in footers if found), "")
                return footer, marks
            if digests and b"Pagination" in content:
                text = page.extract_text()
                footer = next((digest for digest in digests if digest in text), "")
                return footer, [Mark(-1, Kind.FOREIGN, Zone.BODY, number, 0.0, 0.0)]
        except Exception:  # noqa: BLE001 - a page of others may be as odd as it likes
            return "", []
        return "", []

    def _match(self, owns: list[_Own], sources: Sequence[Source]) -> None:
        """Find the records of each package by the digests in its footers."""
        waiting = list(sources)
        for own in owns:
            words = own.footer.split()
            own.sources = [s for s in waiting if s.record.digest in words]
            waiting = [s for s in waiting if s not in own.sources]
        for own in owns:
            if own.footer.endswith("…") and own.sources:
                own.sources, waiting = own.sources + waiting, []
        for own in list(owns):
            if not own.sources:
                self._unmatched(own, owns, waiting)
        for source in waiting if owns or not self.against else ():
            what = "its record is attached but none of its pages is in the file"
            self.alterations.append(Alteration(Where.PRINT, what, source.record.calc_id))

    def _unmatched(self, own: _Own, owns: list[_Own], waiting: list[Source]) -> None:
        """Tell of pages whose footer names a record that is not there."""
        what = f"the footer names record {own.footer}, which is not attached"
        self.alterations.append(Alteration(Where.PRINT, what, page=own.pages[0] + 1))
        home = next((o for o in owns if o.sources and _fits(own, o)), None)
        if home is None and waiting:
            own.sources = [waiting.pop(0)]
        elif home is not None:
            home.take(own)
            owns.remove(own)

    def _compare(self, own: _Own) -> None:
        if not own.sources:
            return
        printed = self._printed(own.sources, self.file.pages[own.pages[0]])
        if not printed:
            return
        fresh = File(printed)
        document = Document(self.keys)
        marks = [m for n, page in enumerate(fresh.pages) for m in document.marks(page, n)]
        lines = lines_of(own.sources)
        compared = compare_pages(marks, own.marks, lines, [page + 1 for page in own.pages])
        self.alterations += compared.alterations
        pages = [(page + 1, self.file.pages[page]) for page in own.pages]
        width = float(fresh.pages[0].mediabox.width)
        self.alterations += cut_pages(pages, own.marks, lines, width)
        if any(source.walk is None for source in own.sources):
            self.outside += compared.outside
        else:
            self.alterations += [
                Alteration(Where.PRINT, "text that the notebook does not hold", page=outside.page,
                           found=outside.text)
                for outside in compared.outside
            ]  # fmt: skip

    def _others(self, owns: Sequence[_Own]) -> None:
        """Note what others have done."""
        self.remarks += self.file.handled()
        mine = {page for own in owns for page in own.pages}
        others = len(self.file.pages) - len(mine) if owns else 0
        if others:
            self.remarks.append(f"{others} page(s) of others before, between or after")
        for number, page in enumerate(self.file.pages):
            if owns and number not in mine:
                continue
            turned = self.file.turned(page)
            if turned and number in mine:
                self.remarks.append(f"page {number + 1}: {turned}")
            for told, box in self.file.annotations(page):
                over = _over(owns, number, box)
                self.remarks.append(f"page {number + 1}: laid over by others: {told}{over}")
        if len(owns) > 1:
            self.remarks.append(f"{len(owns)} packages in one file")
