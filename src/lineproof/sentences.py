"""Words put together to sentences: the capital at their beginning, how many, lists cut short."""

from __future__ import annotations

import re
from collections.abc import Iterable

MOST_LISTED = 6
"""So many items of a list stand in a sentence, unless told otherwise."""
_LETTER = "[a-zà-öø-ÿœ]"
_WORD = re.compile(rf"{_LETTER}{{2,}}(?:[-'’]{_LETTER}+)*[,:;.]?(?=\s|\Z)")
"""A plain word, of a user too. ``d``, ``k_3``, ``λ``, ``f'c`` and ``sag-1/d`` are none."""
_ARTICLE = re.compile(rf"a (?!is\b|has\b|stands\b){_LETTER}{{2,}}")
_SYMBOLS = re.compile(r"(?:alpha|beta|gamma|delta|eps|theta|lambda|phi|rho|sigma|mu|kd)\b")


def begun(text: str) -> str:
    """Return a text that begins with a capital letter, unless it begins with a symbol.

    The review page does the same to titles: ``begun`` in its ``lines.js``.

    >>> begun("write phi_c in its place"), begun("d = 540 mm is typed"), begun("λ is left out")
    ('Write phi_c in its place', 'd = 540 mm is typed', 'λ is left out')
    >>> begun("a section has no bars"), begun("a is the depth of the block")
    ('A section has no bars', 'a is the depth of the block')
    >>> begun("l/480 under live load"), begun("as-built depth"), begun("épaisseur de la dalle")
    ('l/480 under live load', 'As-built depth', 'Épaisseur de la dalle')
    """
    is_word = _WORD.match(text) is not None and _SYMBOLS.match(text) is None
    return f"{text[:1].upper()}{text[1:]}" if is_word or _ARTICLE.match(text) else text


def counted(number: int, one: str, many: str = "") -> str:
    """Return a number with the word for one or for many, by default with an s.

    >>> counted(1, "line"), counted(0, "line"), counted(3, "line carries", "lines carry")
    ('1 line', '0 lines', '3 lines carry')
    """
    return f"{number} {one if number == 1 else many or one + 's'}"


def listed(items: Iterable[str], most: int = MOST_LISTED, between: str = ", ") -> str:
    """Return items as a list in a sentence, cut after the first few.

    >>> listed(["2.8", "3.1", "4.2"], 2), listed(["2.8", "3.1"], 2)
    ('2.8, 3.1 and 1 more', '2.8, 3.1')
    """
    held = list(items)
    rest = len(held) - most
    return between.join(held[:most]) + (f" and {rest} more" if rest > 0 else "")
