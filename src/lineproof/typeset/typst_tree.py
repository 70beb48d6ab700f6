"""Nodes to the maths tree of the Typst template: nested lists of texts, never source text.

Each list begins with the node's key; ``templates/maths.typ`` builds the mark from it.
"""

from __future__ import annotations

from functools import lru_cache

from lineproof.typeset.glyphs import printable
from lineproof.typeset.nodes import (
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

_MOST_KEPT = 8192
TypstTree = list["str | TypstTree | None"]


@lru_cache(maxsize=_MOST_KEPT)
def typst_tree(math: Math) -> TypstTree:
    """Return the node as nested lists, ready for JSON; pieces may be shared, so change none."""
    match math:
        case Row(items):
            return ["row", *map(typst_tree, items)]
        case Fraction(top, bottom):
            return ["frac", _full_size(top), _full_size(bottom)]
        case Root(of, index):
            return ["root", index, typst_tree(of)]
        case Scripts():
            beside = prime_beside(math)
            return [
                "scripts",
                typst_tree(beside.base),
                None if beside.sub is None else typst_tree(beside.sub),
                None if beside.sup is None else typst_tree(beside.sup),
            ]
        case Fence(of, left, right):
            return ["fence", left, typst_tree(of), right]
    return _token(math)


def _full_size(side: Math) -> TypstTree:
    return ["display", typst_tree(side)] if holds_fraction(side) else typst_tree(side)


def _token(math: Math) -> TypstTree:  # noqa: PLR0911 - one return per kind of node
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
