"""Trees into functions: compiled once, from the tree, in the author's order.

A function that is called often is compiled; what is worked out once or twice, such as each line
of a record that is read, is woven of closures, which is made ten times sooner. Both do the same
operations in the same order, so both give the same bits.
"""

from __future__ import annotations

import math
import operator
from collections.abc import Callable, Mapping, Sequence
from functools import lru_cache
from typing import Any

from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree

MOST_KEPT = 4096
"""Functions that are kept: a beam made again asks for the same ones."""
_STRENGTH = {"+": 1, "-": 1, "*": 2, "/": 2, "**": 4}
"""How tightly the operators bind in Python; a sign binds at 3."""
_SIGN, _ATOM = 3, 5
NOT_COMPUTED = (ArithmeticError, ValueError, TypeError)
"""What a formula raises where it has no value: TypeError where a root of a negative is compared."""
PLAIN_COMPARE: dict[str, Callable[[Any, Any], bool]] = {
    "<=": operator.le,
    "<": operator.lt,
    ">=": operator.ge,
    ">": operator.gt,
}
"""The comparisons as they stand, for printed numbers."""

ROUND_OFF = 1e-12
"""Relative difference that is nothing but the rounding of floats: 41.3 by two ways is 41.3."""


def _equal(left: float, right: float) -> bool:
    return abs(left - right) <= ROUND_OFF * max(abs(left), abs(right))


COMPARE: dict[str, Callable[[float, float], bool]] = {
    "<=": lambda left, right: left <= right or _equal(left, right),
    "<": lambda left, right: left < right and not _equal(left, right),
    ">=": lambda left, right: left >= right or _equal(left, right),
    ">": lambda left, right: left > right and not _equal(left, right),
}
"""The comparisons of computed values: a limit met exactly holds, whatever the last bit says."""


def _cbrt(value: float) -> float:
    if value < 0:
        # As sqrt: a negative size under a root is a mistake, and algebra has no real root here.
        msg = "root of a negative number"
        raise ValueError(msg)
    return math.cbrt(value)


def _sin(angle: float) -> float:
    return math.sin(math.radians(angle))


def _cos(angle: float) -> float:
    return math.cos(math.radians(angle))


def _tan(angle: float) -> float:
    return math.tan(math.radians(angle))


def _cot(angle: float) -> float:
    return 1.0 / math.tan(math.radians(angle))


# fabs, since abs of a complex number would hide the root of a negative one.
FUNCTIONS: dict[str, Callable[..., Any]] = {
    "sqrt": math.sqrt, "cbrt": _cbrt, "abs": math.fabs, "min": min, "max": max,
    "sin": _sin, "cos": _cos, "tan": _tan, "cot": _cot,
}  # fmt: skip
"""What the functions of the grammar do with floats; angles are in degrees."""


def called(function: str) -> str:
    """Return what a function of the grammar is called in what is compiled.

    >>> called("sqrt")
    '_sqrt'
    """
    return f"_{function}"


_SCOPE: dict[str, Any] = {called(name): f for name, f in FUNCTIONS.items()} | {
    "_inf": math.inf,
    "_nan": math.nan,
    "__builtins__": {},
}


class _Writer:
    """Writes a tree as Python: operators, floats and the names that it makes itself.

    Nothing of the tree's own text gets in, so that a name can neither hide a function nor be one.
    """

    def __init__(self, names: Sequence[str], suffix: str = "") -> None:
        self._own = {name: f"_{place}{suffix}" for place, name in enumerate(names)}

    def text(self, tree: Tree, least: int = 0) -> str:
        """Return the tree as Python, in brackets if it binds less than asked."""
        made, strength = self._made(tree)
        return made if strength >= least else f"({made})"

    def _made(self, tree: Tree) -> tuple[str, int]:
        match tree:
            case Number(text):
                # Only floats: 9**9**9 then overflows at once instead of filling the memory.
                plain = repr(float(text)).replace("inf", "_inf").replace("nan", "_nan")
                return plain, _SIGN if plain[0] == "-" else _ATOM
            case Name(symbol):
                return self._own.get(symbol, "_unknown"), _ATOM
            case Negative(of):
                return f"-{self.text(of, _ATOM)}", _SIGN
            case Binary(op, left, right):
                strength = _STRENGTH[op]
                # Only a power is read from the right: its left side is bracketed as well.
                first = self.text(left, _ATOM if op == "**" else strength)
                return f"{first}{op}{self.text(right, _ATOM)}", strength
            case Call(function, args):
                callee = called(function) if function in FUNCTIONS else "_unknown"
                return f"{callee}({', '.join(self.text(a) for a in args)})", _ATOM


def compile_tree(tree: Tree, names: Sequence[str]) -> Callable[..., float]:
    """Return the tree as a function of positional floats in the order of ``names``.

    >>> compile_tree(Binary("/", Name("a"), Number("2")), ["a"])(5.0)
    2.5
    """
    return _compiled(tree, tuple(names))


@lru_cache(maxsize=MOST_KEPT)
def _compiled(tree: Tree, names: tuple[str, ...]) -> Callable[..., float]:
    arguments = ", ".join(f"_{place}" for place in range(len(names)))
    text = f"lambda {arguments}: {_Writer(names).text(tree)}"
    function: Callable[..., float] = eval(text, _SCOPE)  # noqa: S307 - written by _Writer
    return function


def compile_step(tree: Tree, names: Sequence[str]) -> Callable[[dict[str, Any]], Any]:
    """Return a function of a scope of entries that gives ``(arguments, value)`` in one call.

    The same expression as :func:`compile_tree`, reading ``entry.value`` in place: recording a
    line is the hot path of every design loop, and one call instead of three halves its cost.
    Raises :class:`KeyError` for a name that the scope does not hold.
    """
    return _step(tree, tuple(names))


@lru_cache(maxsize=MOST_KEPT)
def _step(tree: Tree, names: tuple[str, ...]) -> Callable[[dict[str, Any]], Any]:
    own = [f"_{place}" for place in range(len(names))]
    lines = [
        "def _made(_scope):",
        # A name stands only between quotes.
        *(f"    {to} = _scope[{name!r}]" for to, name in zip(own, names, strict=True)),
        f"    return ({''.join(f'{to}, ' for to in own)}), {_Writer(names, '.value').text(tree)}",
    ]
    scope = dict(_SCOPE)
    exec("\n".join(lines), scope)  # noqa: S102 - written by _Writer
    made: Callable[[dict[str, Any]], Any] = scope["_made"]
    return made


Woven = Callable[[Mapping[str, float]], Any]
"""A tree, or a piece of one, as a function of values by name."""


@lru_cache(maxsize=MOST_KEPT)
def weave_tree(tree: Tree) -> Woven:
    """Return the tree as a function of values by name, for what is worked out a few times only.

    Raises :class:`KeyError` for a name without a value, as it is called.

    >>> weave_tree(Binary("/", Name("a"), Number("2")))({"a": 5.0})
    2.5
    """
    return _weave(tree)


def _weave(tree: Tree) -> Woven:
    match tree:
        case Number(text):
            number = float(text)
            return lambda _: number
        case Name(symbol):
            return operator.itemgetter(symbol)
        case Negative(of):
            inner = _weave(of)
            return lambda values: -inner(values)
        case Binary(op, left, right):
            return _WEAVERS[op](_weave(left), _weave(right))
        case Call(function, args):
            called = FUNCTIONS[function]
            woven = [_weave(a) for a in args]
            return lambda values: called(*[one(values) for one in woven])


_WEAVERS: dict[str, Callable[[Woven, Woven], Woven]] = {
    "+": lambda left, right: lambda values: left(values) + right(values),
    "-": lambda left, right: lambda values: left(values) - right(values),
    "*": lambda left, right: lambda values: left(values) * right(values),
    "/": lambda left, right: lambda values: left(values) / right(values),
    "**": lambda left, right: lambda values: left(values) ** right(values),
}
