"""When code runs, as far as its text shows: always, in a branch or loop, if called, or never."""

from __future__ import annotations

import ast
from collections import deque
from collections.abc import Iterator
from enum import StrEnum


class When(StrEnum):
    """When a piece of a cell is run."""

    ALWAYS = "always"
    BRANCH = "in a branch"
    LOOP = "in a loop"
    CALLED = "if called"
    NEVER = "never"
    IDLE = "in a loop that never runs"


_NOT_RUN = (When.NEVER, When.IDLE)


def walked(tree: ast.AST) -> Iterator[tuple[ast.AST, When]]:
    """Give every node of a tree in the order of :func:`ast.walk`, and when it is run."""
    waiting = deque([(tree, When.ALWAYS)])
    while waiting:
        node, when = waiting.popleft()
        yield node, when
        for name, value in ast.iter_fields(node):
            inner = _inner(node, name)
            held = when if when in _NOT_RUN or inner is When.ALWAYS else inner
            for child in value if isinstance(value, list) else [value]:
                if isinstance(child, ast.AST):
                    waiting.append((child, held))


_HELD = {
    (ast.For, "body"): When.LOOP,
    (ast.AsyncFor, "body"): When.LOOP,
    (ast.Try, "handlers"): When.BRANCH,
    (ast.TryStar, "handlers"): When.BRANCH,
    (ast.Match, "cases"): When.BRANCH,
    (ast.FunctionDef, "body"): When.CALLED,
    (ast.AsyncFunctionDef, "body"): When.CALLED,
    (ast.Lambda, "body"): When.CALLED,
}
"""When a field of a node is run, as seen from the node; fields of conditions aside."""


def _inner(node: ast.AST, name: str) -> When:
    """Return when one field of a node is run, as seen from the node."""
    if isinstance(node, ast.While) and name == "body":
        return When.IDLE if _known(node.test) is False else When.LOOP
    if isinstance(node, ast.For) and name == "body" and _is_empty(node.iter):
        return When.IDLE
    if isinstance(node, ast.If | ast.IfExp) and name != "test":
        known = _known(node.test)
        if known is None:
            return When.BRANCH
        return When.ALWAYS if known is (name == "body") else When.NEVER
    return _HELD.get((type(node), name), When.ALWAYS)


def _is_empty(items: ast.expr) -> bool:
    """Tell whether a loop goes over nothing, as its text shows: [], (), {}, "", range(0)."""
    match items:
        case ast.List(elts=[]) | ast.Tuple(elts=[]) | ast.Dict(keys=[]) | ast.Constant(value=""):
            return True
        case ast.Call(func=ast.Name(id="range"), args=[ast.Constant(value=int(last))]):
            return last <= 0
    return False


def _known(test: ast.expr) -> bool | None:
    """Return the truth of a condition that is a constant, such as False, 0 or not True."""
    match test:
        case ast.Constant(value=value):
            return bool(value)
        case ast.UnaryOp(op=ast.Not(), operand=ast.Constant(value=value)):
            return not value
    return None
