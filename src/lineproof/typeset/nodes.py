"""The marks on paper: one neutral description of typeset mathematics.

The visitor makes these nodes once; TeX, MathML, the marks for Typst and plain text are written from
them, so no two outputs can disagree about a bracket.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from typing import Literal

from lineproof.formula.hashed import Hashed, kept_hash
from lineproof.quantity.digits import MINUS

Role = Literal["binary", "relation", "prefix", "comma", "open", "close"]


@dataclass(frozen=True, slots=True)
class Letter(Hashed):
    """A single italic letter, the base of a symbol."""

    __hash__ = kept_hash

    text: str


@dataclass(frozen=True, slots=True)
class Word(Hashed):
    """Upright text: a subscript, the name of a function, a value in words."""

    __hash__ = kept_hash

    text: str


@dataclass(frozen=True, slots=True)
class Digits(Hashed):
    """An unsigned plain number as the record holds it (``12500.5``)."""

    __hash__ = kept_hash

    text: str


@dataclass(frozen=True, slots=True)
class Sign(Hashed):
    """An operator, relation sign or lone bracket, as the character that is printed."""

    __hash__ = kept_hash

    text: str
    role: Role


@dataclass(frozen=True, slots=True)
class Thin(Hashed):
    """The thin space that stands for multiplication."""

    __hash__ = kept_hash


@dataclass(frozen=True, slots=True)
class Unit(Hashed):
    """A unit in the closed list's ASCII spelling (``kN.m``), after its number."""

    __hash__ = kept_hash

    text: str


@dataclass(frozen=True, slots=True)
class Prime(Hashed):
    """The prime of f'c."""

    __hash__ = kept_hash


@dataclass(frozen=True, slots=True)
class Row(Hashed):
    """Nodes side by side; a row never holds a row."""

    __hash__ = kept_hash

    items: tuple[Math, ...]


@dataclass(frozen=True, slots=True)
class Fraction(Hashed):
    """Numerator over denominator."""

    __hash__ = kept_hash

    top: Math
    bottom: Math


@dataclass(frozen=True, slots=True)
class Root(Hashed):
    """A square root, or with ``index`` "3" a cube root."""

    __hash__ = kept_hash

    of: Math
    index: str = ""


@dataclass(frozen=True, slots=True)
class Scripts(Hashed):
    """A base with a subscript, a superscript or both."""

    __hash__ = kept_hash

    base: Math
    sub: Math | None = None
    sup: Math | None = None


@dataclass(frozen=True, slots=True)
class Fence(Hashed):
    """An expression between brackets or bars that grow with it."""

    __hash__ = kept_hash

    of: Math
    left: str = "("
    right: str = ")"


Math = Letter | Word | Digits | Sign | Thin | Unit | Prime | Row | Fraction | Root | Scripts | Fence

TIMES = "×"
PLUS = Sign("+", "binary")
SUBTRACT = Sign(MINUS, "binary")
MULTIPLY = Sign(TIMES, "binary")
NEGATE = Sign(MINUS, "prefix")
EQUALS = Sign("=", "relation")
COMMA = Sign(",", "comma")
RELATIONS = {
    "<=": Sign("≤", "relation"),
    ">=": Sign("≥", "relation"),
    "<": Sign("<", "relation"),
    ">": Sign(">", "relation"),
}
OPPOSITE = {"<=": ">", ">=": "<", "<": ">=", ">": "<="}
"""The relation that holds when the one named does not."""


def row(items: Iterable[Math]) -> Math:
    """Join nodes side by side; rows inside are opened, one node stays itself."""
    flat: list[Math] = []
    for item in items:
        if isinstance(item, Row):
            flat.extend(item.items)
        else:
            flat.append(item)
    return flat[0] if len(flat) == 1 else Row(tuple(flat))


def prime_beside(scripts: Scripts) -> Scripts:
    """Set primes beside the base instead of above its subscript.

    The fonts' prime is drawn raised already; as a superscript it would shrink to a speck.
    """
    if scripts.sup is None or not all(isinstance(m, Prime) for m in items_of(scripts.sup)):
        return scripts
    return Scripts(row([scripts.base, scripts.sup]), scripts.sub)


def holds_fraction(math: Math) -> bool:
    """Tell whether a fraction stands inside; beside another bar it keeps its full size."""
    match math:
        case Row(items):
            return any(map(holds_fraction, items))
        case Fence(of, _, _) | Root(of, _):
            return holds_fraction(of)
    return isinstance(math, Fraction)


def items_of(math: Math) -> tuple[Math, ...]:
    """Return the nodes of a row, or the node itself as the only one."""
    return math.items if isinstance(math, Row) else (math,)
