"""Print that is no longer seen as it was issued, though every mark is still in the file.

A page of a PDF may say that only a part of it is to be shown. What lies outside is seen by no
reader and printed by no printer: a check that fails could be hidden so. A comment may hide what it
is laid over, and may as well be an honest one: its lines are named.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from typing import Any

from lineproof.audit.verify.data import Alteration, Where
from lineproof.audit.verify.file import Box
from lineproof.audit.verify.page import Kind, Mark
from lineproof.audit.verify.printed import Line, Lines, body_of

_SLACK = 1.0
_ASCENT = 0.6
"""Height of digits as part of the size of a text."""


def cut_pages(
    pages: Sequence[tuple[int, Any]], marks: Sequence[Mark], lines: Sequence[Line], width: float
) -> Iterator[Alteration]:
    """Give the pages that show less than the marks on them, each with its first line hidden.

    ``pages`` are number in the file, counted from 1, and page of a PDF reader; the marks count
    their pages by place in it. ``width`` is that of the paper as issued [pt].
    """
    body = body_of(marks)
    named = list(zip(body, Lines(lines).of(body), strict=True))
    for place, (number, page) in enumerate(pages):
        own = [mark for mark in marks if mark.page == place]
        box = shown_box(page)
        if not own or not _hides(box, own, width):
            continue
        calc, label, id_ = next(
            (
                line
                for mark, line in named
                if mark.page == place and line[1] and _outside(box, mark)
            ),
            ("", "", ""),
        )
        left, low, right, high = box
        size = f"{right - left:.0f} by {high - low:.0f} pt"
        what = f"the page is cut, only {size} of it are shown"
        yield Alteration(Where.DRAWN, what, calc, label, id_, number)


def lines_under(
    box: Box, place: int, marks: Sequence[Mark], lines: Sequence[Line]
) -> tuple[str, ...]:
    """Return the printed numbers of the lines that something laid over a page touches.

    ``place`` is the page among those that the marks count. How far a text reaches to the right is
    not known: one that begins left of the box and at its height is taken as touched.
    """
    body = body_of(marks)
    _, low, right, high = box
    touched = (
        line[1]
        for mark, line in zip(body, Lines(lines).of(body), strict=True)
        if mark.page == place and mark.x < right and low < _top(mark) and mark.y < high
    )
    return tuple(dict.fromkeys(label for label in touched if label))


def shown_box(page: Any) -> Box:
    """Return the part of a page of a PDF reader that is shown: its crop within its medium."""
    boxes = [page.cropbox, page.mediabox]
    return (
        max(float(box.left) for box in boxes), max(float(box.bottom) for box in boxes),
        min(float(box.right) for box in boxes), min(float(box.top) for box in boxes),
    )  # fmt: skip


def _hides(box: Box, marks: Sequence[Mark], width: float) -> bool:
    """Tell whether print is hidden: empty margins may be cut off, the right one as the left."""
    left, low, right, high = box
    margin = min((mark.x for mark in marks if mark.kind is not Kind.FOREIGN), default=0.0)
    sides = left > margin + _SLACK or right < width - margin - _SLACK
    return sides or any(mark.y < low or _top(mark) > high for mark in marks)


def _top(mark: Mark) -> float:
    return mark.y + (_ASCENT * mark.size if mark.kind is Kind.TEXT else 0.0)


def _outside(box: Box, mark: Mark) -> bool:
    left, low, right, high = box
    return not (left <= mark.x <= right and low <= mark.y <= high)
