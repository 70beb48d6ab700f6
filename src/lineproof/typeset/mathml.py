"""Nodes to MathML Core."""

from __future__ import annotations

from html import escape

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

_THIN = '<mspace width="0.1667em"></mspace>'
_COMMA_SPACE = '<mo separator="true">,</mo>'


def mathml(math: Math) -> str:
    """Return a complete ``<math>`` element (its text escaped, safe inside HTML)."""
    # displaystyle keeps fractions legible on paper while the element stays in the line.
    return f'<math displaystyle="true">{_write(math)}</math>'


def _is_tall(math: Math) -> bool:
    """Tell whether brackets must grow; around plain letters the font's own bracket sits closer."""
    match math:
        case Row(items):
            return any(map(_is_tall, items))
        case Fraction() | Root():
            return True
        case Fence(of, _, _):
            return _is_tall(of)
    return False


def _full_size(side: Math) -> str:
    """Write a side of a fraction; a fraction inside it would else be set too small to read."""
    if not holds_fraction(side):
        return _write(side)
    return f'<mrow displaystyle="true" scriptlevel="0">{_write(side)}</mrow>'


def _text(text: str) -> str:
    return escape(printable(text))


def _write(math: Math) -> str:  # noqa: PLR0911 - one return per kind of node
    match math:
        case Row(items):
            return f"<mrow>{''.join(map(_write, items))}</mrow>"
        case Fraction(top, bottom):
            return f"<mfrac>{_full_size(top)}{_full_size(bottom)}</mfrac>"
        case Root(of, ""):
            return f"<msqrt>{_write(of)}</msqrt>"
        case Root(of, index):
            return f"<mroot>{_write(of)}<mn>{_text(index)}</mn></mroot>"
        case Scripts():
            return _scripts(prime_beside(math))
        case Fence(of, left, right):
            grows = "true" if _is_tall(of) else "false"
            return (
                f'<mrow><mo stretchy="{grows}" form="prefix">{_text(left)}</mo>{_write(of)}'
                f'<mo stretchy="{grows}" form="postfix">{_text(right)}</mo></mrow>'
            )
    return _write_token(math)


def _write_token(math: Math) -> str:  # noqa: PLR0911 - one return per kind of node
    match math:
        case Letter(text):
            return f"<mi>{_text(text)}</mi>"
        case Word(text):
            edges = text.strip(" ") != text
            kept = _text(text.replace(" ", "\u00a0")) if edges else _text(text)
            return f"<mtext>{kept}</mtext>"
        case Digits(text):
            return f"<mn>{_text(grouped(text))}</mn>"
        case Sign(text, role):
            return _sign(text, role)
        case Thin():
            return _THIN
        case Unit("deg"):
            return "<mtext>°</mtext>"
        case Unit(text):
            return f"{_THIN}<mtext>{_text(unit_text(text))}</mtext>"
        case Prime():
            return '<mo lspace="0" rspace="0">′</mo>'
    msg = f"{math!r} is no node"
    raise TypeError(msg)


def _sign(text: str, role: str) -> str:
    if role == "prefix":
        return f'<mo form="prefix">{_text(text)}</mo>'
    if role in ("open", "close"):
        form = "prefix" if role == "open" else "postfix"
        return f'<mo stretchy="false" form="{form}">{_text(text)}</mo>'
    if text == ",":
        return _COMMA_SPACE
    if text == "/":
        return '<mo lspace="0" rspace="0">/</mo>'
    return f"<mo>{_text(text)}</mo>"


def _scripts(math: Scripts) -> str:
    base = _write(math.base)
    below = "" if math.sub is None else _write(math.sub)
    above = "" if math.sup is None else _write(math.sup)
    if below and above:
        return f"<msubsup>{base}{below}{above}</msubsup>"
    if below:
        return f"<msub>{base}{below}</msub>"
    return f"<msup>{base}{above}</msup>" if above else base
