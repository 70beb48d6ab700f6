"""The one visitor over a formula's tree: brackets, fractions, roots and products are decided here.

Author's order is kept.  A bracket stands where leaving it out would allow another reading,
and nowhere else.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import lru_cache

from lineproof.formula.notation import Notation, Symbol
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree, names_of
from lineproof.typeset.nodes import (
    COMMA,
    MULTIPLY,
    NEGATE,
    PLUS,
    SUBTRACT,
    Digits,
    Fence,
    Fraction,
    Math,
    Root,
    Scripts,
    Sign,
    Thin,
    Unit,
    Word,
    row,
)
from lineproof.typeset.values import (
    has_superscript,
    number_math,
    split_number,
    symbol_math,
    symbol_of,
)

_SUM, _PRODUCT, _SIGNED, _CLOSED = 1, 2, 3, 4
_MOST_KEPT = 8192
"""Formulas, symbols and numbers that are kept as typeset: they stand in line after line."""
_ANGLE_FUNCTIONS = ("sin", "cos", "tan", "cot")


@dataclass(frozen=True, slots=True)
class Piece:
    """A typeset subexpression and what its neighbours must know.

    ``binding`` tells how tightly its outermost marks hold; ``signed`` that it begins with a
    minus; ``digit`` that it begins with a digit; ``raisable`` that a power may be set on it bare;
    ``sides`` are those of a fraction.
    """

    math: Math
    binding: int = _CLOSED
    signed: bool = False
    digit: bool = False
    raisable: bool = True
    sides: tuple[Piece, Piece] | None = None

    @property
    def fraction(self) -> bool:
        """Tell whether this is a fraction."""
        return self.sides is not None


Leaf = Callable[[str], Piece]


def formula_math(tree: Tree, notation: Notation) -> Math:
    """Typeset a tree with its symbols."""
    return _with_symbols(tree, tuple(symbol_of(name, notation) for name in names_of(tree)))


@lru_cache(maxsize=_MOST_KEPT)
def _with_symbols(tree: Tree, symbols: tuple[Symbol, ...]) -> Math:
    by_name = dict(zip(names_of(tree), symbols, strict=True))
    return _Visitor(lambda name: _symbol_piece(by_name[name]), spaced=True).visit(tree).math


def substitution_math(
    tree: Tree, printed_args: Mapping[str, str], notation: Notation | None = None
) -> Math:
    """Typeset a tree with the printed numbers in the places of its symbols."""
    symbols = notation if notation is not None else Notation(())

    def leaf(name: str) -> Piece:
        text = printed_args.get(name)
        return _symbol_piece(symbol_of(name, symbols)) if text is None else _number_piece(text)

    return _Visitor(leaf, spaced=False).visit(tree).math


@lru_cache(maxsize=_MOST_KEPT)
def _symbol_piece(symbol: Symbol) -> Piece:
    math = symbol_math(symbol)
    return Piece(math, raisable=not has_superscript(math))


@lru_cache(maxsize=_MOST_KEPT)
def _number_piece(text: str) -> Piece:
    parts = split_number(text)
    math = number_math(text)
    if parts is None:
        return Piece(math, raisable=False)
    sign, _, power = parts
    binding = _PRODUCT if power else _SIGNED if sign else _CLOSED
    return Piece(math, binding, signed=bool(sign), digit=not sign)


def _fenced(piece: Piece) -> Math:
    return Fence(piece.math)


class _Visitor:
    """Turns a tree into a piece; ``spaced`` sets products of symbols with a thin space."""

    def __init__(self, leaf: Leaf, *, spaced: bool) -> None:
        self.leaf = leaf
        self.spaced = spaced

    def visit(self, tree: Tree) -> Piece:  # noqa: PLR0911 - one return per kind of node
        match tree:
            case Number(text):
                return _number_piece(text)
            case Name(name):
                return self.leaf(name)
            case Negative(of):
                return self._negative(self.visit(of))
            case Binary("+" | "-" as op, left, right):
                return self._sum(op, self.visit(left), self.visit(right))
            case Binary("*", left, right):
                return self._product(self.visit(left), self.visit(right))
            case Binary("/", left, right):
                return self._fraction(self.visit(left), self.visit(right))
            case Binary("**", left, right):
                return self._power(self.visit(left), right)
            case Call(function, args):
                return self._call(function, [self.visit(arg) for arg in args])
        msg = f"{tree!r} is no tree"
        raise TypeError(msg)

    def _negative(self, piece: Piece) -> Piece:
        bare = piece.binding >= _PRODUCT and not piece.signed
        return Piece(row([NEGATE, piece.math if bare else _fenced(piece)]), _SIGNED, signed=True)

    def _sum(self, op: str, left: Piece, right: Piece) -> Piece:
        open_sum = right.binding == _SUM and op == "-"
        math = _fenced(right) if open_sum or right.signed else right.math
        sign = PLUS if op == "+" else SUBTRACT
        return Piece(row([left.math, sign, math]), _SUM, left.signed, left.digit)

    def _product(self, left: Piece, right: Piece) -> Piece:
        first = _fenced(left) if left.binding == _SUM else left.math
        closed = right.binding > _SUM and not right.signed
        second = right.math if closed else _fenced(right)
        crowded = right.digit and closed
        sign: Sign | Thin = Thin() if self.spaced and not crowded else MULTIPLY
        digit = left.digit and left.binding > _SUM
        signed = left.signed and left.binding > _SUM
        return Piece(row([first, sign, second]), _PRODUCT, signed, digit)

    def _fraction(self, top: Piece, bottom: Piece) -> Piece:
        math = Fraction(_beside_bar(top), _beside_bar(bottom))
        return Piece(math, digit=top.digit, raisable=False, sides=(top, bottom))

    def _power(self, base: Piece, exponent: Tree) -> Piece:
        index = _root_index(exponent)
        if index is not None:
            return Piece(Root(base.math, index), raisable=False)
        bare = base.binding == _CLOSED and base.raisable
        below = base.math if bare else _fenced(base)
        above = _in_line(self, exponent)
        # A bracketed base begins with no digit, whatever stands inside.
        return Piece(_raised(below, above), digit=base.digit and bare, raisable=False)

    def _call(self, function: str, args: list[Piece]) -> Piece:
        if function in ("sqrt", "cbrt"):
            return Piece(Root(args[0].math, "3" if function == "cbrt" else ""), raisable=False)
        if function == "abs":
            return Piece(Fence(args[0].math, "|", "|"))
        inside: list[Math] = []
        for arg in args:
            inside += [COMMA, arg.math] if inside else [arg.math]
        if function in _ANGLE_FUNCTIONS and isinstance(args[0].math, Digits):
            inside.append(Unit("deg"))
        return Piece(row([Word(function), Fence(row(inside))]), raisable=False)


def _beside_bar(piece: Piece) -> Math:
    """Set a side of a fraction; a fraction there gets brackets and a solidus.

    A bar over a bar would be read by its length alone.
    """
    if piece.sides is None:
        return piece.math
    top, bottom = piece.sides
    # A product over the solidus is read as a whole, one under it is not.
    above = _fenced(top) if top.binding == _SUM or top.fraction else top.math
    below = bottom.math if bottom.binding == _CLOSED and not bottom.fraction else _fenced(bottom)
    return Fence(row([above, Sign("/", "comma"), below]))


def _raised(below: Math, above: Math) -> Math:
    if isinstance(below, Scripts) and below.sup is None:
        return Scripts(below.base, below.sub, above)
    return Scripts(below, None, above)


def _root_index(exponent: Tree) -> str | None:
    match exponent:
        case Number("0.5" | ".5") | Binary("/", Number("1" | "1.0"), Number("2" | "2.0")):
            return ""
        case Binary("/", Number("1" | "1.0"), Number("3" | "3.0")):
            return "3"
    return None


def _in_line(visitor: _Visitor, exponent: Tree) -> Math:
    """Typeset an exponent; a fraction there stands on one line with a solidus."""
    match exponent:
        case Binary("/", left, right):
            sides = []
            for side in (visitor.visit(left), visitor.visit(right)):
                closed = side.binding == _CLOSED and not side.fraction
                sides.append(side.math if closed else _fenced(side))
            return row([sides[0], Sign("/", "comma"), sides[1]])
        case Negative(Binary("/", _, _) as of):
            return row([NEGATE, _in_line(visitor, of)])
    return visitor.visit(exponent).math


__all__ = ["Piece", "formula_math", "substitution_math"]
