"""Arithmetic of Python code as a formula's tree, in the catalogue's symbols; nothing is run."""

from __future__ import annotations

import ast
import re
from collections.abc import Callable
from functools import cache
from typing import Any

from lineproof.formula import Binary, Call, Name, Negative, Number, Tree
from lineproof.quantity.units import UNITS, internal_factor, plain_spelling
from lineproof.standards.catalogue import NOTATION

DEEPEST = 60
"""Levels of an expression that are read."""
TRIGONOMETRIC = ("sin", "cos", "tan")
TO_RADIANS = ("radians", "deg2rad")
_TO_DEGREES = ("degrees", "rad2deg")
_LARGEST = 1e300
_LONGEST = 12
_SPOKEN = {
    "fpc": "f_c", "fc_prime": "f_c", "lam": "lambda_", "lamda": "lambda_", "lmbda": "lambda_",
    "lambd": "lambda_", "L": "l", "span": "l",
}  # fmt: skip
"""What hands call symbols in code, beside the id without its underscores."""
_OPERATORS: dict[type[ast.operator], str] = {
    ast.Add: "+", ast.Sub: "-", ast.Mult: "*", ast.Div: "/", ast.Pow: "**",
}  # fmt: skip
_ROOTS = {"sqrt": "sqrt", "cbrt": "cbrt", "abs": "abs", "fabs": "abs"}
_EXTREMES = {"min": "min", "max": "max", "minimum": "min", "maximum": "max"}
_CONVERTED = ("to", "ito")
_PASSED = ("float", "round", "int")
_QUANTITIES = ("Quantity", "Q_")
_REGISTRIES = ("u", "ureg", "unit", "units")
"""What the registry of units is called, of which ``m`` is the metre."""
_ONE_UNIT = Number("1e0")
"""A unit that is one of the internal units."""
_BARE = ("magnitude", "m")
_DEGREES_IN_RADIAN = Number("57.29577951308232")
_PI = Number("3.141592653589793")
_IDENTIFIER = re.compile(r"[A-Za-z][A-Za-z0-9_]{0,39}\Z")


@cache
def _by_letters() -> dict[str, str]:
    found: dict[str, list[str]] = {}
    for symbol in NOTATION:
        found.setdefault(symbol.replace("_", ""), []).append(symbol)
    return {letters: ids[0] for letters, ids in found.items() if len(ids) == 1}


def symbol_of(name: str) -> str:
    """Return the symbol that a name of code stands for: ``fc`` is f_c; else the name itself.

    >>> symbol_of("fc"), symbol_of("M_r"), symbol_of("curb")
    ('f_c', 'M_r', 'curb')
    """
    if name in NOTATION:
        return name
    return _by_letters().get(name.replace("_", ""), _SPOKEN.get(name, name))


def last_name(node: ast.AST) -> str:
    """Return the last name of ``a.b.c``, "" for anything else."""
    match node:
        case ast.Name(id=name) | ast.Attribute(attr=name):
            return name
    return ""


def called(node: ast.AST) -> str:
    """Return the name of what a call calls, "" for anything else."""
    return last_name(node.func) if isinstance(node, ast.Call) else ""


def tree_of(node: ast.AST | None) -> Tree | None:
    """Return arithmetic as a tree in the symbols of the catalogue; None for anything else.

    >>> tree_of(ast.parse("fc*2", mode="eval").body)
    Binary(op='*', left=Name(id='f_c'), right=Number(text='2'))
    """
    return _read(node, 0)


def _read(node: ast.AST | None, depth: int) -> Tree | None:
    reader = _READERS.get(type(node))
    return None if reader is None or depth > DEEPEST else reader(node, depth + 1)


def _name(name: str) -> Tree | None:
    if name == "pi":
        return _PI
    return Name(symbol_of(name)) if _IDENTIFIER.match(name) else None


def _constant(node: ast.Constant, _: int) -> Tree | None:
    value = node.value
    if isinstance(value, bool) or not isinstance(value, int | float) or not value < _LARGEST:
        return None
    text = repr(value)
    # A long integer is kept as a float: no formula has so many digits.
    long = isinstance(value, int) and len(text) > _LONGEST
    return Number(repr(float(value)) if long else text)


def _unary(node: ast.UnaryOp, depth: int) -> Tree | None:
    inner = _read(node.operand, depth)
    if inner is None or isinstance(node.op, ast.UAdd):
        return inner
    return Negative(inner) if isinstance(node.op, ast.USub) else None


def _binary(node: ast.BinOp, depth: int) -> Tree | None:
    sign = _OPERATORS.get(type(node.op))
    left, right = _read(node.left, depth), _read(node.right, depth)
    if sign is None or left is None or right is None:
        return None
    if (right is _ONE_UNIT and sign in "*/") or (left is _ONE_UNIT and sign == "**"):
        return left
    return Binary(sign, left, right)


def _attribute(node: ast.Attribute, depth: int) -> Tree | None:
    unit = plain_spelling(node.attr)
    is_metre = node.attr not in _BARE or last_name(node.value) in _REGISTRIES
    if unit in UNITS and isinstance(node.value, ast.Name) and is_metre:  # such as u.mm
        return _unit(unit)
    if node.attr in _BARE:
        held = _read(node.value, depth)
        to = _unit_of(node.value) if called(node.value) in _CONVERTED else None
        return held if held is None or to is None else _over(held, to)
    return _name(node.attr)


def _unit(unit: str) -> Number:
    factor = internal_factor(unit)
    return _ONE_UNIT if factor == 1 else Number(repr(factor))


def _over(held: Tree, unit: Number) -> Tree:
    return held if unit is _ONE_UNIT else Binary("/", held, unit)


def _unit_of(node: ast.AST) -> Number | None:
    """Return the unit that a call names last, as in ``Q_(8.4, "m")`` and ``x.to("m")``."""
    match node:
        case ast.Call(args=[*_, ast.Constant(value=str() as text)]):
            unit = plain_spelling(text.replace("**", "^"))
            return _unit(unit) if unit in UNITS else None
    return None


def _subscript(node: ast.Subscript, _: int) -> Tree | None:
    match node.slice:
        case ast.Constant(value=str() as key):
            return _name(key)
    return None


def _call(node: ast.Call, depth: int) -> Tree | None:
    function = last_name(node.func)
    if function in _CONVERTED and isinstance(node.func, ast.Attribute):
        return _read(node.func.value, depth)
    if function in _PASSED:
        return _read(node.args[0], depth) if node.args else None
    if function in _QUANTITIES and node.args:
        return _quantity(node, depth)
    args = [_read(arg, depth) for arg in node.args]
    held = tuple(arg for arg in args if arg is not None)
    if node.keywords or not held or len(held) != len(args):
        return None
    if len(held) > 1:
        return Call(_EXTREMES[function], held) if function in _EXTREMES else None
    return _of_one(function, held[0])


def _quantity(node: ast.Call, depth: int) -> Tree | None:
    """Return a number with its unit; a unit that is not read here gives nothing."""
    number, unit = _read(node.args[0], depth), _unit_of(node)
    if len(node.args) == 1 or number is None or unit is _ONE_UNIT:
        return number
    return None if unit is None else Binary("*", number, unit)


def _of_one(function: str, tree: Tree) -> Tree | None:
    if function in _ROOTS:
        return Call(_ROOTS[function], (tree,))
    if function in TRIGONOMETRIC:
        # Angles of Python are in radians, those of a formula in degrees.
        if isinstance(tree, Binary) and (tree.op, tree.right) == ("/", _DEGREES_IN_RADIAN):
            return Call(function, (tree.left,))
        return Call(function, (Binary("*", tree, _DEGREES_IN_RADIAN),))
    if function in TO_RADIANS:
        return Binary("/", tree, _DEGREES_IN_RADIAN)
    return Binary("*", tree, _DEGREES_IN_RADIAN) if function in _TO_DEGREES else None


_READERS: dict[type, Callable[[Any, int], Tree | None]] = {
    ast.Constant: _constant,
    ast.Name: lambda node, _: _name(node.id),
    ast.UnaryOp: _unary,
    ast.BinOp: _binary,
    ast.Attribute: _attribute,
    ast.Subscript: _subscript,
    ast.Call: _call,
}
