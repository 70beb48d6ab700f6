"""Nodes to plain text, as one would read the formula aloud: for alternative texts and consoles."""

from __future__ import annotations

from functools import lru_cache

from lineproof.formula.notation import GREEK
from lineproof.typeset.glyphs import printable
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
)

_NAMES = {letter: name for name, letter in reversed(GREEK.items())}
_SIGNS = {"−": "-", "×": "x", "≤": "<=", "≥": ">="}


@lru_cache(maxsize=16384)
def plain(math: Math) -> str:
    """Return the formula in one line of plain text.

    Fractions carry the brackets that the bar made needless: ``a / (b + c)``.
    """
    return _write(math)


def _write(math: Math) -> str:
    match math:
        case Row(items):
            return _row(items)
        case Fraction(top, bottom):
            return f"{_operand(top, sums_only=True)} / {_operand(bottom, sums_only=False)}"
        case Root(of, index):
            return f"{'cbrt' if index else 'sqrt'}({_write(of)})"
        case Scripts(base, sub, sup):
            return _scripts(base, sub, sup)
        case Fence(of, left, right):
            return f"{left}{_write(of)}{right}"
    return _write_token(math)


def _write_token(  # noqa: C901, PLR0911 - one return per kind of node
    math: Math,
) -> str:
    match math:
        case Letter(text) | Word(text):
            return "".join(_NAMES.get(c, c) for c in printable(text))
        case Digits(text):
            return text
        case Sign(text, "prefix" | "open" | "close"):
            return _SIGNS.get(text, text)
        case Sign("/", _):
            return "/"
        case Sign(",", _):
            return ", "
        case Sign(text, _):
            return f" {_SIGNS.get(text, text)} "
        case Thin():
            return " "
        case Unit("deg"):
            return " degrees"
        case Unit(text):
            return f" {printable(text)}"
        case Prime():
            return "'"
    msg = f"{math!r} is no node"
    raise TypeError(msg)


def _row(items: tuple[Math, ...]) -> str:
    factors = {
        near
        for place, item in enumerate(items)
        if isinstance(item, Thin) or (isinstance(item, Sign) and item.text == TIMES)
        for near in (place - 1, place + 1)
    }
    return "".join(
        f"({_write(item)})" if place in factors and isinstance(item, Fraction) else _write(item)
        for place, item in enumerate(items)
    )


def _operand(math: Math, *, sums_only: bool) -> str:
    items = items_of(math)
    marks = [item for item in items if isinstance(item, Sign) and item.role == "binary"]
    sums = any(mark.text != TIMES for mark in marks)
    products = bool(marks) or any(isinstance(item, Thin) for item in items)
    text = _write(math)
    return f"({text})" if sums or (products and not sums_only) else text


def _scripts(base: Math, sub: Math | None, sup: Math | None) -> str:
    below = _write(sub) if sub is not None else ""
    if sup is None:
        return f"{_write(base)}_{below}"
    above = _write(sup)
    if all(isinstance(item, Prime) for item in items_of(sup)):
        return f"{_write(base)}{above}{below}"
    if below:
        below = f"_{below}"
    simple = isinstance(sup, Digits | Word | Letter)
    return f"{_write(base)}{below}^{above}" if simple else f"{_write(base)}{below}^({above})"
