"""Words put together to sentences: the capital at their beginning, which no symbol gets."""

from __future__ import annotations

import re

_WORD = re.compile(r"[a-z]{2,}(?:[-'’][a-z]+)*[,:;.]?(?=\s|\Z)")
"""A word of plain English. ``d``, ``k_3``, ``λ``, ``f'c`` and ``sag-1/d`` are none."""
_ARTICLE = re.compile(r"a (?!is\b|has\b|stands\b)[a-z]{2,}")
_SYMBOLS = re.compile(r"(?:alpha|beta|gamma|delta|eps|theta|lambda|phi|rho|sigma|mu|kd)\b")


def begun(text: str) -> str:
    """Return a text that begins with a capital letter, unless it begins with a symbol.

    >>> begun("write phi_c in its place"), begun("d = 540 mm is typed"), begun("λ is left out")
    ('Write phi_c in its place', 'd = 540 mm is typed', 'λ is left out')
    >>> begun("a section has no bars"), begun("a is the depth of the block")
    ('A section has no bars', 'a is the depth of the block')
    """
    is_word = _WORD.match(text) is not None and _SYMBOLS.match(text) is None
    return f"{text[:1].upper()}{text[1:]}" if is_word or _ARTICLE.match(text) else text
