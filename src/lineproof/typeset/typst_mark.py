"""Nodes to the marks of the Typst template: flat lists of texts and places, never source text.

Each list begins with the node's key; ``templates/maths.typ`` builds the mark from it and from the
marks that stand before it.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence

from lineproof.typeset.glyphs import printable
from lineproof.typeset.nodes import (
    MULTIPLY,
    NEGATE,
    PLUS,
    SUBTRACT,
    Digits,
    Fence,
    Fraction,
    Letter,
    Math,
    Prime,
    Root,
    Row,
    Scripts,
    Sign,
    Thin,
    Unit,
    Word,
    holds_fraction,
    prime_beside,
)
from lineproof.typeset.values import grouped, unit_text

NO_BREAK_SPACE = "\u00a0"
_JOINING = frozenset({PLUS, SUBTRACT, MULTIPLY})
TypstMark = list[str | int | bool | None]


def typst_mark(math: Math, place: Callable[[Math], int]) -> TypstMark:
    """Return a node as a list ready for JSON; ``place`` tells where a node inside it stands."""
    match math:
        case Row(items):
            parts = list(_joined(items))
            return typst_mark(parts[0], place) if len(parts) == 1 else ["row", *map(place, parts)]
        case Fraction(top, bottom):
            return ["frac", place(top), holds_fraction(top), place(bottom), holds_fraction(bottom)]
        case Root(of, index):
            return ["root", index, place(of)]
        case Scripts():
            beside = prime_beside(math)
            marks = (beside.base, beside.sub, beside.sup)
            return ["scripts", *(None if mark is None else place(mark) for mark in marks)]
        case Fence(of, left, right):
            return ["fence", left, place(of), right]
    return _token(math)


def _joined(items: Sequence[Math]) -> Iterator[Math]:
    """Give the nodes of a row, with stretches that hold numbers, signs and units only as one word.

    A number alone is set digit by digit, each a text of its own; a word is one text. The signs
    between are as wide with no-break spaces as with the spaces of mathematics, within 0.02 em.
    """
    place = 0
    while place < len(items):
        end = _end_of_figures(items, place)
        if end - place > 1:
            yield Word("".join(map(_in_word, items[place:end])))
        else:
            end = place + 1
            yield items[place]
        place = end


def _end_of_figures(items: Sequence[Math], start: int) -> int:
    """Return where a stretch such as "-1.5 x 20.4 kN" ends; ``start`` where there is none."""
    end, at = start, start
    while at < len(items):
        if isinstance(items[at], Sign) and items[at] == NEGATE:
            at += 1
        if at == len(items) or not isinstance(items[at], Digits):
            break
        at += 1
        if at < len(items) and isinstance(items[at], Unit):
            at += 1
        end = at
        if at == len(items) or items[at] not in _JOINING:
            break
        at += 1
    return end


def _in_word(item: Math) -> str:
    match item:
        case Digits(text):
            return grouped(text)
        case Unit("deg"):
            return "°"
        case Unit(text):
            return NO_BREAK_SPACE + printable(unit_text(text))
        case Sign(text, "binary"):
            return NO_BREAK_SPACE + text + NO_BREAK_SPACE
        case Sign(text, _):
            return text
    msg = f"{item!r} is no part of a stretch of numbers"
    raise TypeError(msg)


def _token(math: Math) -> TypstMark:  # noqa: PLR0911 - one return per kind of node
    match math:
        case Letter(text):
            return ["letter", printable(text)]
        case Word(text):
            return ["word", printable(text)]
        case Digits(text):
            return ["word", grouped(text)]
        case Sign(text, role):
            return [role, text]
        case Thin():
            return ["thin"]
        case Unit("deg"):
            return ["word", "°"]
        case Unit(text):
            return ["unit", printable(unit_text(text))]
        case Prime():
            return ["prime"]
    msg = f"{math!r} is no node"
    raise TypeError(msg)
