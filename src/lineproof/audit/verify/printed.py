"""Pages as printed against pages printed again from the record: every mark accounted for.

Both are drawn by the same printer, so what the record prints is the same mark for mark: glyphs,
sizes, places across the page, distances down the page. Prose of a notebook stands between and is
not in the record; everything else that differs has been altered.
"""

from __future__ import annotations

import re
from collections import Counter, defaultdict
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, field
from itertools import pairwise
from unicodedata import normalize

from lineproof.audit.verify.align import Gap, gaps
from lineproof.audit.verify.data import Alteration, Outside, Where
from lineproof.audit.verify.page import SHORT_RULE, Kind, Mark, Zone

_SAME_HEIGHT = 0.06
"""Points by which a distance down the page may differ: the last digits of a printed place."""
_ROW = 3.0
_ASCENT, _WITHIN = 0.75, 2.0
_CHAINED = 300
"""Marks between two differences that may belong to one row broken by the end of a page."""
_LARGEST_OF_ROWS = 10.3
_FORMULA = re.compile("[\U0001d400-\U0001d7ff]")
_LABEL = re.compile(r"\d+\.\d+\Z")
_TOTAL = re.compile(r"Page \d+ of (\d+)\Z")

Line = tuple[str, str, str]
"""Calculation, printed number and id of a line."""


@dataclass(frozen=True, slots=True)
class Compared:
    """What comparing the pages of one package has found; ``alike`` is the share found again."""

    alterations: tuple[Alteration, ...]
    outside: tuple[Outside, ...]
    alike: float


def compare_pages(
    fresh: Sequence[Mark], given: Sequence[Mark], lines: Iterable[Line], numbers: Sequence[int]
) -> Compared:
    """Compare marks printed from a record with those of a file.

    ``numbers`` are the pages of the file that belong to the package, counted from 1; the marks
    count their pages within the package.
    """
    pages = _Pages(fresh, given, Lines(lines), numbers)
    found = [*pages.texts(), *pages.heights(), *pages.named_pages(), *pages.drawn()]
    found += [*pages.running(), *pages.foreign()]
    found.sort(key=lambda altered: altered.page)
    return Compared(tuple(dict.fromkeys(found)), tuple(pages.outside), pages.alike)


class Lines:
    """The lines of the records in the order of print."""

    def __init__(self, lines: Iterable[Line]) -> None:
        self.lines = [line for line in lines if line[1]]
        self.labels = {label for _, label, _ in self.lines}

    def of(self, marks: Sequence[Mark]) -> list[Line]:
        """Return for each mark the line of the working in which it stands."""
        column = Counter(round(m.x, 1) for m in marks if m.text in self.labels)
        left = column.most_common(1)[0][0] if column else None
        places: dict[str, list[int]] = defaultdict(list)
        for place, (_, label, _) in enumerate(self.lines):
            places[label].append(place)
        made, now, at = [], ("", "", ""), -1
        for mark in marks:
            if mark.text in self.labels and round(mark.x, 1) == left:
                at = next((place for place in places[mark.text] if place > at), at)
                now = self.lines[at]
            elif mark.size > _LARGEST_OF_ROWS:
                now = ("", "", "")
            made.append(now)
        self.left = left
        return made


@dataclass
class _Pages:
    """Both sets of pages, their bodies side by side."""

    fresh: Sequence[Mark]
    given: Sequence[Mark]
    lines: Lines
    numbers: Sequence[int]
    outside: list[Outside] = field(default_factory=list)

    def __post_init__(self) -> None:
        self.ours, self.theirs = body_of(self.fresh), body_of(self.given)
        self.line = self.lines.of(self.ours)
        self.gaps = gaps([m.key for m in self.ours], [m.key for m in self.theirs])
        missing = sum(gap.last - gap.first for gap in self.gaps)
        self.alike = 1 - missing / max(len(self.ours), 1)
        self.runs = list(_runs(self.gaps, len(self.ours)))

    # -- texts -------------------------------------------------------------------------------

    def texts(self) -> Iterator[Alteration]:
        """Give what is missing, changed or added."""
        for chain in _chained(self.gaps):
            if self._reflowed(chain):
                continue
            for gap in chain:
                yield from self._gap(gap)

    def _gap(self, gap: Gap) -> Iterator[Alteration]:
        if gap.first < gap.last:
            found = self.theirs[gap.start : gap.end]
            same = _text(found) == _text(self.ours[gap.first : gap.last])
            what = "drawn otherwise" if same else "the print differs"
            yield self._altered(gap, what, Where.DRAWN if same else Where.PRINT)
            return
        for piece in _by_page(self.theirs[gap.start : gap.end]):
            reason = self._not_prose(gap, piece)
            if reason:
                yield self._altered(gap, reason, Where.PRINT, piece)
            elif _text(piece).strip():
                after = self.line[gap.first - 1][1] if gap.first else ""
                self.outside.append(Outside(_text(piece), self._number(piece[0]), after))

    def _not_prose(self, gap: Gap, piece: Sequence[Mark]) -> str:
        """Say why added marks are no text between the lines, "" where they are."""
        page = piece[0].page
        before = [m for m in self.theirs[max(gap.start - 60, 0) : gap.start] if m.page == page]
        after = [m for m in self.theirs[gap.end : gap.end + 60] if m.page == page]
        if any(_LABEL.match(m.text) and round(m.x, 1) == self.lines.left for m in piece):
            return "a line stands here that the record does not hold"
        top = max(m.y + _ASCENT * m.size for m in piece)
        last_row = [m.y for m in before if m.y < before[-1].y + _ROW]
        floor = max((m.y for m in after if m.y > after[0].y - _ROW), default=0.0)
        if before and top > min(last_row) + _WITHIN:
            return "something is written over the print"
        if after and min(m.y for m in piece) < floor - _WITHIN:
            return "something is written over the print"
        if before and after and gap.first and gap.first < len(self.ours):
            row = abs(before[-1].y - after[0].y) < _SAME_HEIGHT
            return "something is written inside a line" if row else ""
        return ""

    def _reflowed(self, chain: Sequence[Gap]) -> bool:
        """Tell whether the same marks stand here in another order, a row parted by a page's end."""
        ours = self.ours[chain[0].first : chain[-1].last]
        theirs = self.theirs[chain[0].start : chain[-1].end]
        if len({m.page for m in ours}) < 2 and len({m.page for m in theirs}) < 2:  # noqa: PLR2004
            return False
        return _columns(ours) == _columns(theirs)

    def _altered(self, gap: Gap, what: str, where: Where, piece: Sequence[Mark] = ()) -> Alteration:
        at = min(gap.first, len(self.ours) - 1)
        calc, label, entry_id = self.line[at] if self.line else ("", "", "")
        marks = (
            piece or self.theirs[gap.start : gap.end] or self.theirs[max(gap.start - 1, 0) :][:1]
        )
        recorded = "" if piece else _row_text(self.ours, gap.first, gap.last)
        found = _text(piece) if piece else _row_text(self.theirs, gap.start, gap.end)
        page = self._number(marks[0]) if marks else 0
        return Alteration(where, what, calc, label, entry_id, page, recorded, found)

    def _number(self, mark: Mark) -> int:
        return self.numbers[mark.page] if mark.page < len(self.numbers) else 0

    # -- places ------------------------------------------------------------------------------

    def heights(self) -> Iterator[Alteration]:
        """Give what stands at another height than the record prints it, or within a figure."""
        for first, start, count in self.runs:
            ours, theirs = self.ours[first : first + count], self.theirs[start : start + count]
            pairs = zip(ours, theirs, strict=True)
            for place, (pair, following) in enumerate(pairwise(pairs), first):
                if _moved(pair, following) or _figure_moved(*following):
                    gap = Gap(place + 1, place + 2, start + place + 1 - first, 0)
                    yield self._placed(gap)

    def _placed(self, gap: Gap) -> Alteration:
        calc, label, entry_id = self.line[gap.first]
        mark = self.theirs[gap.start]
        what = f"{_quoted(mark)} stands at another place than the record prints it"
        return Alteration(Where.DRAWN, what, calc, label, entry_id, self._number(mark))

    def named_pages(self) -> Iterator[Alteration]:
        """Give page numbers, of the contents and of references, that name another page."""
        falls: dict[int, set[int]] = defaultdict(set)
        named = []
        for first, start, count in self.runs:
            for step in range(count):
                ours, theirs = self.ours[first + step], self.theirs[start + step]
                falls[ours.page].add(theirs.page)
                if ours.number:
                    named.append((ours, theirs))
        for ours, theirs in named:
            if theirs.number - 1 not in falls[ours.number - 1]:
                what = f"{_quoted(theirs)} names the wrong page"
                yield Alteration(Where.PRINT, what, page=self._number(theirs))

    # -- lines, boxes, running heads -----------------------------------------------------------

    def drawn(self) -> Iterator[Alteration]:
        """Give boxes and short rules that are not those of the record, and rules through text."""
        kept = Counter(_shapes(self.fresh))
        for shape, mark in _placed_shapes(self.given):
            kept[shape] -= 1
            if kept[shape] < 0 and (mark.kind is Kind.SHAPE or mark.size < SHORT_RULE):
                what = "a box or a line is drawn here that the record does not print"
                yield Alteration(Where.DRAWN, what, page=self._number(mark))
        for shape, count in kept.items():
            if count > 0 and shape[0] is not Kind.RULE:
                yield Alteration(Where.DRAWN, "a box that the record prints is missing")
        yield from self._struck(Counter(_long_rules(self.fresh)))

    def _struck(self, known: Counter[int]) -> Iterator[Alteration]:
        texts: dict[int, list[Mark]] = defaultdict(list)
        for mark in self.theirs:
            texts[mark.page].append(mark)
        for mark in self.given:
            if mark.kind is not Kind.RULE or mark.size < SHORT_RULE or mark.zone is not Zone.BODY:
                continue
            known[mark.key] -= 1
            if known[mark.key] < 0 and any(_crosses(mark, text) for text in texts[mark.page]):
                what = "a line is drawn through the print"
                yield Alteration(Where.DRAWN, what, page=self._number(mark))

    def running(self) -> Iterator[Alteration]:
        """Give running heads and repeated heads of tables that are not those of the record."""
        heads = {(m.key, round(m.y)) for m in self.fresh if m.zone is Zone.RUNNING}
        known = {m.key for m in self.fresh if m.zone is not Zone.RUNNING}
        again = {(m.key, round(m.y)) for m in self.fresh if m.zone is Zone.AGAIN}
        top: dict[int, float] = defaultdict(float)
        for mark in self.theirs:
            top[mark.page] = max(top[mark.page], mark.y)
        for mark in self.given:
            wrong = (
                mark.zone is Zone.RUNNING
                and ((mark.key, round(mark.y)) not in heads or self._miscounted(mark))
            ) or (
                mark.zone is Zone.AGAIN
                and (mark.key, round(mark.y)) not in again  # below a drawing, as printed anew
                and (mark.key not in known or mark.y < top[mark.page] - _SAME_HEIGHT)
            )
            if wrong:
                what = f"the running head {_quoted(mark)} is not that of the record"
                yield Alteration(Where.PRINT, what, page=self._number(mark))

    def _miscounted(self, mark: Mark) -> bool:
        total = _TOTAL.match(mark.text)
        count = len(self.numbers)
        return mark.number > 0 and (
            mark.number != mark.page + 1 or total is None or int(total[1]) != count
        )

    def foreign(self) -> Iterator[Alteration]:
        """Give what our printer does not write."""
        for mark in self.given:
            if mark.kind is Kind.FOREIGN:
                text = f" ({_quoted(mark)})" if mark.text.strip() else ""
                what = f"something is drawn on the page by another program{text}"
                yield Alteration(Where.DRAWN, what, page=self._number(mark))


def body_of(marks: Sequence[Mark]) -> list[Mark]:
    """Return texts and figures of the pages, without the dots that lead to a page number."""
    made: list[Mark] = []
    dots: list[Mark] = []
    for mark in marks:
        if mark.zone is not Zone.BODY or mark.kind not in (Kind.TEXT, Kind.FIGURE):
            continue
        if mark.text == ".":
            dots.append(mark)
            continue
        leads = mark.number > 0 and all(abs(dot.y - mark.y) < _SAME_HEIGHT for dot in dots)
        made += [*([] if leads else dots), mark]
        dots = []
    return made + dots


def _runs(found: Sequence[Gap], count: int) -> Iterator[tuple[int, int, int]]:
    """Give the stretches found again: start in both and length."""
    first = start = 0
    for gap in found:
        if gap.first > first:
            yield first, start, gap.first - first
        first, start = gap.last, gap.end
    if count > first:
        yield first, start, count - first


def _chained(found: Sequence[Gap]) -> list[list[Gap]]:
    """Gather differences that stand near one another."""
    chains: list[list[Gap]] = []
    for gap in found:
        if chains and gap.first - chains[-1][-1].last < _CHAINED:
            chains[-1].append(gap)
        else:
            chains.append([gap])
    return chains


def _columns(marks: Iterable[Mark]) -> dict[float, list[int]]:
    """Return the marks of each column from top to bottom."""
    found: dict[float, list[int]] = defaultdict(list)
    for mark in sorted(marks, key=lambda m: (m.page, -m.y)):
        found[round(mark.x, 1)].append(mark.key)
    return found


def _by_page(marks: Sequence[Mark]) -> list[list[Mark]]:
    pages: dict[int, list[Mark]] = defaultdict(list)
    for mark in marks:
        pages[mark.page].append(mark)
    return list(pages.values())


def _moved(pair: tuple[Mark, Mark], following: tuple[Mark, Mark]) -> bool:
    """Tell whether two marks of one page stand at another distance than as printed again."""
    (ours, theirs), (our_next, their_next) = pair, following
    if ours.page != our_next.page or theirs.page != their_next.page:
        return False
    return abs((our_next.y - ours.y) - (their_next.y - theirs.y)) > _SAME_HEIGHT


def _figure_moved(ours: Mark, theirs: Mark) -> bool:
    return any(
        abs(a - b) > _SAME_HEIGHT for a, b in zip(ours.inner, theirs.inner, strict=False)
    ) or len(ours.inner) != len(theirs.inner)


def _text(marks: Iterable[Mark]) -> str:
    """Return what marks say, a space where a new line begins; letters of formulas as letters."""
    said = []
    last: Mark | None = None
    for mark in marks:
        below = last is not None and (mark.page != last.page or last.y - mark.y > _ROW)
        said.append(f" {mark.text}" if below else mark.text)
        last = mark
    return _FORMULA.sub(lambda found: normalize("NFKC", found[0]), "".join(said))


def _quoted(mark: Mark) -> str:
    return f"“{mark.text.strip()[:60]}”"


def _row_text(marks: Sequence[Mark], first: int, last: int) -> str:
    """Return the text of marks with what stands beside them on the same height."""
    if first >= last:
        return ""
    start, end = first, last
    while start > 0 and _beside(marks[start - 1], marks[first]) and first - start < 30:  # noqa: PLR2004
        start -= 1
    while end < len(marks) and _beside(marks[end], marks[last - 1]) and end - last < 30:  # noqa: PLR2004
        end += 1
    return _text(marks[start:end]).strip()


def _beside(one: Mark, other: Mark) -> bool:
    return one.page == other.page and abs(one.y - other.y) < _ROW and abs(one.x - other.x) < 120  # noqa: PLR2004


_Shape = tuple[Kind, int, int, float]


def _placed_shapes(marks: Iterable[Mark]) -> Iterator[tuple[_Shape, Mark]]:
    """Give boxes and short rules, each with the text before it and its height over that."""
    text: Mark | None = None
    for mark in marks:
        if mark.kind is Kind.TEXT and mark.zone is Zone.BODY:
            text = mark
        short = mark.kind is Kind.RULE and mark.size < SHORT_RULE
        if mark.kind is Kind.SHAPE or (short and mark.zone is Zone.BODY):
            near = text is not None and text.page == mark.page and mark.kind is Kind.SHAPE
            height = round(mark.y - text.y) if near and text is not None else 0
            yield (mark.kind, mark.key, text.key if near and text else 0, height), mark


def _shapes(marks: Iterable[Mark]) -> Iterator[_Shape]:
    for shape, _ in _placed_shapes(marks):
        yield shape


def _long_rules(marks: Iterable[Mark]) -> Iterator[int]:
    for mark in marks:
        if mark.kind is Kind.RULE and mark.size >= SHORT_RULE and mark.zone is Zone.BODY:
            yield mark.key


def _crosses(rule: Mark, text: Mark) -> bool:
    width = 0.35 * text.size * len(text.text)
    over = text.x < rule.x + rule.size and rule.x < text.x + width
    return over and 0.1 * text.size < rule.y - text.y < 0.6 * text.size
