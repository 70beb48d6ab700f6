"""The grammar of formulas: plain arithmetic, read by Python's own parser through a whitelist.

Nothing of a formula's text is ever run. Allowed are numbers, names, ``+ - * / **``, a sign,
brackets and the functions of :data:`FUNCTIONS`; a criterion has exactly one comparison.
"""

from __future__ import annotations

import ast
import re
from functools import lru_cache

from lineproof.errors import UserError
from lineproof.formula.notation import check_id
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree

LONGEST = 400
DEEPEST = 40
MOST_KEPT = 4096
"""Texts whose trees are kept: a record is read, checked and printed from the same texts."""
FUNCTIONS = {
    "sqrt": (1, 1), "cbrt": (1, 1), "abs": (1, 1), "min": (2, 9), "max": (2, 9),
    "sin": (1, 1), "cos": (1, 1), "tan": (1, 1), "cot": (1, 1),
}  # fmt: skip
"""Functions of the grammar with their least and most arguments; angles are in degrees."""

_OPERATORS: dict[type[ast.operator], str] = {
    ast.Add: "+",
    ast.Sub: "-",
    ast.Mult: "*",
    ast.Div: "/",
    ast.Pow: "**",
}
_NUMBER = re.compile(r"\d{1,12}(\.\d{1,12})?([eE][+-]?\d{1,2})?\Z|\.\d{1,12}\Z")
_COMPARISON = re.compile(r"<=|>=|<|>")
_FOREIGN = re.compile(r"[^A-Za-z0-9_+\-*/()., ]")


class FormulaError(UserError):
    """A formula's text is not plain arithmetic."""


def _refuse(text: str, why: str) -> FormulaError:
    shown = text if len(text) <= 80 else text[:79] + "…"  # noqa: PLR2004 - one line of an error
    return FormulaError(f"formula {shown!r}: {why}")


def parse_expression(text: str) -> Tree:
    """Read an expression into a tree; raise :class:`FormulaError` for anything else.

    >>> parse_expression("a + b").op
    '+'
    """
    if len(text) > LONGEST:
        raise _refuse(text, f"longer than {LONGEST} characters; split it into two lines")
    if not text.isascii():
        raise _refuse(text, "use ASCII names such as 'phi_s', 'f_c' (Greek is typeset for you)")
    foreign = _FOREIGN.search(text)
    if foreign is not None:
        raise _refuse(text, f"{foreign[0]!r} is not plain arithmetic")
    try:
        body = ast.parse(text.strip(), mode="eval").body
        return _convert(body, text, 0)
    except (SyntaxError, ValueError, RecursionError, MemoryError) as error:
        if isinstance(error, FormulaError):
            raise
        raise _refuse(text, "not plain arithmetic; write for example 'a*b/(c + d)'") from None


def _convert(node: ast.expr, text: str, depth: int) -> Tree:
    if depth > DEEPEST:
        raise _refuse(text, "nested too deeply; split it into two lines")
    match node:
        case ast.Constant():
            return Number(_number(node, text))
        case ast.Name(id=name):
            return Name(check_id(name))
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            return Negative(_convert(operand, text, depth + 1))
        case ast.BinOp(left=left, op=op, right=right) if type(op) in _OPERATORS:
            return Binary(
                _OPERATORS[type(op)],
                _convert(left, text, depth + 1),
                _convert(right, text, depth + 1),
            )
        case ast.Call(func=ast.Name(id=name), args=args, keywords=[]) if name in FUNCTIONS:
            return _call(name, args, text, depth)
        case ast.Call(func=ast.Name(id=name)):
            known = ", ".join(FUNCTIONS)
            raise _refuse(text, f"{name[:40]!r} is not a function of formulas; there are {known}")
    raise _refuse(text, f"{type(node).__name__} is not arithmetic")


def _call(name: str, args: list[ast.expr], text: str, depth: int) -> Call:
    least, most = FUNCTIONS[name]
    if not least <= len(args) <= most:
        raise _refuse(text, f"{name} takes {least} to {most} arguments, not {len(args)}")
    return Call(name, tuple(_convert(a, text, depth + 1) for a in args))


def _number(node: ast.Constant, text: str) -> str:
    written = text.strip()[node.col_offset : node.end_col_offset]  # one line of ASCII
    if type(node.value) not in (int, float) or not _NUMBER.match(written):
        raise _refuse(text, f"{written[:20]!r} is not a plain number")
    return written


@lru_cache(maxsize=MOST_KEPT)
def parse_line(text: str) -> tuple[str, Tree]:
    """Read ``symbol = expression`` into the symbol's id and the expression's tree."""
    left, equals, right = text.partition("=")
    if not equals or _COMPARISON.search(text) or "=" in right:
        raise _refuse(text, "write one symbol, one equals sign and an expression: 'a = b*c'")
    return check_id(left.strip()), parse_expression(right)


@lru_cache(maxsize=MOST_KEPT)
def parse_criterion(text: str) -> tuple[Tree, str, Tree]:
    """Read ``expression <= expression`` (or ``<``, ``>=``, ``>``) into left, sign and right."""
    signs = _COMPARISON.findall(text)
    if len(signs) != 1 or "==" in text or "!=" in text:
        raise _refuse(text, "a criterion has exactly one comparison: 'M_f <= M_r'; write two")
    left, right = text.split(signs[0])
    return parse_expression(left), signs[0], parse_expression(right)
