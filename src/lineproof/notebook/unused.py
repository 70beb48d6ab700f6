"""Inputs that a notebook sets and never uses: they look like a choice and change nothing."""

from __future__ import annotations

import ast
import re
import warnings
from collections.abc import Iterable, Iterator

from lineproof.notebook.cells import PARAMETERS, Cell

_MAGIC = re.compile(r"\s*[%!?]")
_WORD = re.compile(r"[^\W\d]\w*")
_READS_ALL = {"globals", "locals", "vars", "eval", "exec", "get_ipython"}
"""Calls by which code may use a name without writing it."""


def unused_inputs(cells: Iterable[Cell]) -> tuple[str, ...]:
    """Return the names that the cell of inputs sets and no code uses, in their order.

    Code that cannot be read as Python counts as using every word in it: running it tells why.
    """
    codes = [cell for cell in cells if cell.kind == "code"]
    trees = [_tree(cell.source) for cell in codes]
    used: set[str] = set()
    for cell, tree in zip(codes, trees, strict=True):
        used |= {*_WORD.findall(cell.source)} if tree is None else {*_loaded(tree)}
    if used & _READS_ALL:
        return ()
    own = [tree for cell, tree in zip(codes, trees, strict=True) if PARAMETERS in cell.tags]
    names = [name for tree in own if tree is not None for name in _assigned(tree)]
    return tuple(name for name in dict.fromkeys(names) if name not in used and name[0] != "_")


def _tree(source: str) -> ast.Module | None:
    lines = ["" if _MAGIC.match(line) else line for line in source.splitlines()]
    try:
        with warnings.catch_warnings(action="ignore"):  # an escape in a text is the author's
            return ast.parse("\n".join(lines))
    except (SyntaxError, ValueError, RecursionError, MemoryError):
        return None


def _loaded(tree: ast.Module) -> Iterator[str]:
    for node in ast.walk(tree):
        if isinstance(node, ast.Name) and not isinstance(node.ctx, ast.Store):
            yield node.id


def _assigned(tree: ast.Module) -> Iterator[str]:
    """Give the names that plain assignments at the left edge of a cell set."""
    for node in tree.body:
        targets = node.targets if isinstance(node, ast.Assign) else []
        if isinstance(node, ast.AnnAssign):
            targets = [node.target]
        yield from (target.id for target in targets if isinstance(target, ast.Name))
