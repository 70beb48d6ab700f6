"""Trees into functions: compiled once, from the tree, in the author's order."""

from __future__ import annotations

import ast
import math
import operator
from collections.abc import Callable, Sequence
from functools import lru_cache
from typing import Any

from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree

MOST_KEPT = 4096
"""Functions that are kept: a beam made again asks for the same ones."""
_BINARY: dict[str, type[ast.operator]] = {
    "+": ast.Add,
    "-": ast.Sub,
    "*": ast.Mult,
    "/": ast.Div,
    "**": ast.Pow,
}
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
_FUNCTIONS: dict[str, object] = {
    "sqrt": math.sqrt, "cbrt": _cbrt, "abs": math.fabs, "min": min, "max": max,
    "sin": _sin, "cos": _cos, "tan": _tan, "cot": _cot,
}  # fmt: skip


def _python(tree: Tree) -> ast.expr:
    match tree:
        case Number(text):
            # Only floats: 9**9**9 then overflows at once instead of filling the memory.
            return ast.Constant(float(text))
        case Name(symbol):
            return ast.Name(symbol, ast.Load())
        case Negative(of):
            return ast.UnaryOp(ast.USub(), _python(of))
        case Binary(op, left, right):
            return ast.BinOp(_python(left), _BINARY[op](), _python(right))
        case Call(function, args):
            # A name with a space cannot be a symbol, so no symbol can hide a function.
            callee = ast.Name(f"function {function}", ast.Load())
            return ast.Call(callee, [_python(a) for a in args], [])


def _scope() -> dict[str, Any]:
    return {f"function {name}": f for name, f in _FUNCTIONS.items()} | {"__builtins__": {}}


def compile_tree(tree: Tree, names: Sequence[str]) -> Callable[..., float]:
    """Return the tree as a function of positional floats in the order of ``names``.

    >>> compile_tree(Binary("/", Name("a"), Number("2")), ["a"])(5.0)
    2.5
    """
    return _compiled(tree, tuple(names))


@lru_cache(maxsize=MOST_KEPT)
def _compiled(tree: Tree, names: tuple[str, ...]) -> Callable[..., float]:
    arguments = ast.arguments(
        posonlyargs=[], args=[ast.arg(n) for n in names], kwonlyargs=[], kw_defaults=[], defaults=[]
    )
    module = ast.fix_missing_locations(ast.Expression(ast.Lambda(arguments, _python(tree))))
    # The code object is built from whitelisted nodes, never from text.
    function: Callable[..., float] = eval(compile(module, "formula", "eval"), _scope())  # noqa: S307
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
    fetch: list[ast.stmt] = [
        ast.Assign(
            [ast.Name(name, ast.Store())],
            ast.Subscript(ast.Name("the scope", ast.Load()), ast.Constant(name), ast.Load()),
        )
        for name in names
    ]
    args = ast.Tuple([ast.Name(name, ast.Load()) for name in names], ast.Load())
    result = ast.Return(ast.Tuple([args, _ReadValues().visit(_python(tree))], ast.Load()))
    arguments = ast.arguments([], [ast.arg("the scope")], None, [], [], None, [])
    step = ast.FunctionDef("step", arguments, [*fetch, result], [], None)
    module = ast.fix_missing_locations(ast.Module([step], []))
    scope = _scope()
    # Built from whitelisted nodes, never from text.
    exec(compile(module, "formula", "exec"), scope)  # noqa: S102
    made: Callable[[dict[str, Any]], Any] = scope["step"]
    return made


class _ReadValues(ast.NodeTransformer):
    """Reads ``entry.value`` wherever the expression names a quantity."""

    def visit_Name(self, node: ast.Name) -> ast.expr:
        if node.id.startswith("function "):
            return node
        return ast.Attribute(node, "value", ast.Load())
