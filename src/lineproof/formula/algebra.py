"""A tree as sympy writes it, by which two formulas are proved equal.

Constants become exact rationals of their decimal text, so that 0.1 + 0.2 - 0.3 is zero.
"""

from __future__ import annotations

from collections.abc import Callable
from functools import cache
from typing import Any

from lineproof.errors import UserError
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree

Expr = Any
"""A sympy expression; sympy ships no types."""


@cache
def symbol(symbol_id: str) -> Expr:
    """Return the one sympy symbol of an id; all quantities are real."""
    import sympy  # noqa: PLC0415 - 0.25 s, only for algebra

    return sympy.Symbol(symbol_id, real=True)


@cache
def expression(tree: Tree) -> Expr:
    """Return the sympy form of a tree; angles are in degrees as in the grammar."""
    import sympy  # noqa: PLC0415 - 0.25 s, only for algebra

    match tree:
        case Number(text):
            return sympy.Rational(text)
        case Name(symbol_id):
            return symbol(symbol_id)
        case Negative(of):
            return -expression(of)
        case Binary(op, left, right):
            return _BINARY[op](expression(left), expression(right))
        case Call(function, args):
            return _function(function, [expression(a) for a in args])


_LONGEST_POWER = 4096
"""Bits of an exact power of constants; 9**9**9 would fill the memory."""


def _power(base: Expr, exponent: Expr) -> Expr:
    if base.is_Rational and exponent.is_Rational:
        bits = max(abs(base.p), base.q).bit_length()
        if bits * abs(exponent) > _LONGEST_POWER:
            raise UserError(f"a power of constants with more than {_LONGEST_POWER} bits")
    return base**exponent


_BINARY: dict[str, Callable[[Any, Any], Any]] = {
    "+": lambda a, b: a + b,
    "-": lambda a, b: a - b,
    "*": lambda a, b: a * b,
    "/": lambda a, b: a / b,
    "**": _power,
}


def _function(name: str, args: list[Expr]) -> Expr:
    import sympy  # noqa: PLC0415 - 0.25 s, only for algebra

    if name in ("sin", "cos", "tan", "cot"):
        return getattr(sympy, name)(args[0] * sympy.pi / 180)
    known = {
        "sqrt": sympy.sqrt, "cbrt": sympy.cbrt, "abs": sympy.Abs,
        "min": sympy.Min, "max": sympy.Max,
    }  # fmt: skip
    return known[name](*args)
