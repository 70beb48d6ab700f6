"""Rough widths of nodes, to decide where a long formula breaks. Widths are in em of the text."""

from __future__ import annotations

from collections.abc import Iterator
from functools import lru_cache

from lineproof.typeset.nodes import (
    TIMES,
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
    items_of,
    row,
)
from lineproof.typeset.values import grouped, unit_text

_CHARACTER, _DIGIT, _SCRIPT, _FENCE, _ROOT = 0.52, 0.5, 0.7, 0.35, 0.75
_SIGN_WIDTHS = {"relation": 1.35, "binary": 1.2, "prefix": 0.65, "comma": 0.45,
                "open": 0.35, "close": 0.35}  # fmt: skip
_THIN = 0.17
_MOST_KEPT = 16384
"""Nodes whose width is kept: the same symbols, units and numbers stand in many lines."""


@lru_cache(maxsize=_MOST_KEPT)
def width(math: Math) -> float:
    """Return the estimated width of a node, in em."""
    match math:
        case Row(items):
            return sum(map(width, items))
        case Fraction(top, bottom):
            return max(width(top), width(bottom)) + 0.1
        case Root(of, _):
            return width(of) + _ROOT
        case Scripts(base, sub, sup):
            scripts = (width(part) for part in (sub, sup) if part is not None)
            return width(base) + _SCRIPT * max(scripts, default=0.0)
        case Fence(of, _, _):
            return width(of) + 2 * _FENCE
    return _token_width(math)


def _token_width(math: Math) -> float:
    match math:
        case Letter(text) | Word(text):
            return _CHARACTER * len(text)
        case Digits(text):
            return _DIGIT * len(grouped(text))
        case Unit(text):
            return _THIN + _CHARACTER * len(unit_text(text))
        case Sign(_, role):
            return _SIGN_WIDTHS[role]
        case Thin():
            return _THIN
        case Prime():
            return 0.3
    msg = f"{math!r} is no node"
    raise TypeError(msg)


def broken(math: Math, limit: float) -> tuple[Math, ...]:
    """Break a row before its relation, plus, minus and multiplication signs so that lines fit.

    Each piece is at most ``limit`` em wide where the marks allow it; relations break first, the
    insides of brackets last.
    """
    if width(math) <= limit:
        return (math,)
    pieces: list[Math] = []
    for side in _parts(math, ("relation",), ""):
        pieces += _packed(side, limit)
    return tuple(pieces)


def _parts(math: Math, roles: tuple[str, ...], but: str) -> list[Math]:
    parts: list[list[Math]] = [[]]
    for item in items_of(math):
        if parts[-1] and isinstance(item, Sign) and item.role in roles and item.text != but:
            parts.append([])
        parts[-1].append(item)
    return [row(part) for part in parts]


def _packed(math: Math, limit: float) -> list[Math]:
    """Fill lines with whole terms, then, where a term is too long, with its factors."""
    lines: list[Math] = []
    for part in _fitting(math, limit):
        if lines and width(lines[-1]) + width(part) <= limit:
            lines[-1] = row([lines[-1], part])
        else:
            lines.append(part)
    return lines


def _fitting(math: Math, limit: float) -> Iterator[Math]:
    """Give terms; of a term that is too long its factors; of such a factor its bracket's inside."""
    for term in _parts(math, ("binary",), TIMES):
        if width(term) <= limit:
            yield term
            continue
        for part in _parts(term, ("binary",), ""):
            opened = _opened(part)
            if width(part) <= limit or opened == part:
                yield part
            else:
                yield from _fitting(opened, limit)


def _opened(math: Math) -> Math:
    """Take brackets apart so that a line may break inside them."""
    nodes: list[Math] = []
    for item in items_of(math):
        if isinstance(item, Fence):
            nodes += [Sign(item.left, "open"), item.of, Sign(item.right, "close")]
        else:
            nodes.append(item)
    return row(nodes)


def shrink(math: Math, limit: float) -> float:
    """Return by what a node that cannot break must be made smaller to fit, from 1 down to 0.45."""
    needed = width(math)
    # The estimate may be short by a tenth; a mark that nearly fits must not run over.
    return 1.0 if needed <= limit else max(0.45, 0.9 * limit / needed)
