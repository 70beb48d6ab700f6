"""Algebra by sympy, derived from the tree: derivatives, solving, equality.

Constants become exact rationals of their decimal text, so that 0.1 + 0.2 - 0.3 is zero.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from functools import cache
from typing import Any

from lineproof.errors import UserError
from lineproof.formula.compiled import compile_tree
from lineproof.formula.formula import Formula
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree, names_of

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


def value_at(tree: Tree, values: Mapping[str, float], digits: int = 50) -> float:
    """Return the sympy form's value at the given floats, evaluated with ``digits`` digits.

    Raises :class:`UserError` where there is no real value.
    """
    import sympy  # noqa: PLC0415 - 0.25 s, only for algebra

    at = {symbol(name): sympy.Rational(value) for name, value in values.items()}
    value = expression(tree).subs(at).evalf(digits)
    if not value.is_Float and not value.is_Rational:
        raise UserError(f"no real value, but {str(value)[:60]}")
    return float(value)


def partial_derivative(formula: Formula, name: str) -> Callable[..., float]:
    """Return the derivative of the formula by one argument, a function of ``formula.names``.

    Values are in internal units. Raises :class:`UserError` if ``name`` is no argument.
    """
    import sympy  # noqa: PLC0415 - 0.25 s, only for algebra

    if name not in formula.names:
        raise UserError(f"{formula.symbol}: {name!r} is not one of {', '.join(formula.names)}")
    slope = sympy.diff(expression(formula.tree), symbol(name))
    function: Callable[..., float] = sympy.lambdify(
        [symbol(n) for n in formula.names], slope, "math"
    )
    return function


def same(first: Tree, second: Tree) -> bool:
    """Prove two formulas equal: their difference simplifies to zero."""
    import sympy  # noqa: PLC0415 - 0.25 s, only for algebra

    if set(names_of(first)) != set(names_of(second)):
        return False
    return bool(sympy.simplify(expression(first) - expression(second)) == 0)


def solve_for(
    formula: Formula,
    name: str,
    result: float,
    values: Mapping[str, float],
    *,
    low: float,
    high: float,
) -> float:
    """Return the value of ``name`` in [low, high] at which the formula gives ``result``.

    Solved exactly by sympy where it can; through min, max and the like by bisection. All values
    in internal units. Raises :class:`UserError` if there is none in the range.
    """
    exact = _exact_roots(formula, name, result, values)
    inside = [root for root in exact if low <= root <= high]
    if inside:
        return min(inside)
    return _bisect(_residual(formula, name, result, values), low, high, f"{formula.symbol}: {name}")


def _exact_roots(
    formula: Formula, name: str, result: float, values: Mapping[str, float]
) -> list[float]:
    import sympy  # noqa: PLC0415 - 0.25 s, only for algebra

    at = {symbol(n): sympy.Rational(v) for n, v in values.items() if n != name}
    equation = expression(formula.tree).subs(at) - sympy.Rational(result)
    try:
        roots = sympy.solve(equation, symbol(name))
    except RuntimeError:  # so sympy says that it knows no way
        return []
    numbers = [complex(root.evalf(30)) for root in roots if not root.free_symbols]
    return [number.real for number in numbers if abs(number.imag) < 1e-12 * (1 + abs(number.real))]


def _residual(
    formula: Formula, name: str, result: float, values: Mapping[str, float]
) -> Callable[[float], float]:
    function = compile_tree(formula.tree, formula.names)

    def residual(x: float) -> float:
        return function(*[x if n == name else values[n] for n in formula.names]) - result

    return residual


def _bisect(function: Callable[[float], float], low: float, high: float, what: str) -> float:
    at_low, at_high = function(low), function(high)
    if at_low == 0:
        return low
    if (at_low > 0) == (at_high > 0) and at_high != 0:
        raise UserError(f"{what} has no solution between {low:g} and {high:g}")
    for _ in range(200):
        middle = (low + high) / 2
        if middle in (low, high):
            break
        low, high = (middle, high) if (function(middle) > 0) == (at_low > 0) else (low, middle)
    return (low + high) / 2
