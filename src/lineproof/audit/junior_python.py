"""Python code of a notebook read as text: what it assigns, records and calls. Nothing is run."""

from __future__ import annotations

import ast
import re
import warnings
from collections.abc import Iterator
from dataclasses import dataclass, field

from lineproof.audit.junior_arithmetic import last_name, symbol_of, tree_of
from lineproof.audit.junior_cells import CODE, LONGEST_CELL, Cell
from lineproof.formula import Tree

_MAGIC = re.compile(r"^\s*([%!?]|.*\?\s*$)")


@dataclass(frozen=True, slots=True)
class Assigned:
    """One plain assignment: the name, its symbol, the tree of what is assigned, and its text.

    ``tree`` is None for anything but arithmetic; ``typed`` is the text of an assigned string;
    ``comment`` stands behind it in the line. ``plain`` tells that it runs once, in order.
    """

    cell: Cell
    name: str
    symbol: str
    text: str
    tree: Tree | None
    typed: str = ""
    comment: str = ""
    plain: bool = True


@dataclass(frozen=True, slots=True)
class Recorded:
    """A call that records into a sheet: its method, the texts given, those named by keyword."""

    cell: Cell
    method: str
    texts: tuple[str, ...]
    named: dict[str, str] = field(default_factory=dict)


@dataclass(frozen=True, slots=True)
class Code:
    """A cell's code as read: ``fault`` tells why it was not."""

    cell: Cell
    tree: ast.Module | None
    source: str
    fault: str = ""


def read_code(cell: Cell) -> Code | None:
    """Read a code cell; magics and commands of the system are left out. None for other cells."""
    if cell.kind != CODE or not cell.source.strip():
        return None
    if len(cell.source) > LONGEST_CELL:
        return Code(cell, None, "", f"longer than {LONGEST_CELL} characters")
    if cell.source.lstrip().startswith("%%"):
        return Code(cell, None, "", "not Python, but for another program")
    lines = ["pass" if _MAGIC.match(line) else line for line in cell.source.split("\n")]
    source = "\n".join(lines)
    try:
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")
            return Code(cell, ast.parse(source), source)
    except SyntaxError as error:
        return Code(cell, None, "", f"no Python that can be read, line {error.lineno or 1}")
    except (ValueError, RecursionError, MemoryError):
        return Code(cell, None, "", "nested too deeply or damaged")


def assigned(code: Code) -> Iterator[Assigned]:
    """Give the assignments of a cell in order."""
    lines = code.source.split("\n")
    for statement, plain in _statements(code):
        target, value = _target(statement)
        if target is None or value is None:
            continue
        text = ast.get_source_segment(code.source, value) or ""
        typed = value.value if isinstance(value, ast.Constant) else None
        comment = ""
        if statement.end_lineno and statement.end_lineno <= len(lines):
            rest = lines[statement.end_lineno - 1].encode()[statement.end_col_offset or 0 :]
            comment = rest.decode(errors="replace").partition("#")[2].strip()
        yield Assigned(
            code.cell, target, symbol_of(target), " ".join(text.split()), tree_of(value),
            typed if isinstance(typed, str) else "", comment, plain,
        )  # fmt: skip


def _target(statement: ast.stmt) -> tuple[str | None, ast.expr | None]:
    match statement:
        case ast.Assign(targets=[ast.Name(id=name)], value=value):
            return name, value
        case ast.AnnAssign(target=ast.Name(id=name), value=value):
            return name, value
        case ast.AugAssign(target=ast.Name(id=name)):
            return name, ast.Constant(None)
    return None, None


def _statements(code: Code) -> Iterator[tuple[ast.stmt, bool]]:
    """Give statements in order, and whether they run once; loops and branches may not."""
    waiting = [(s, True) for s in reversed(code.tree.body)] if code.tree else []
    while waiting:
        statement, plain = waiting.pop()
        yield statement, plain
        inner = plain and isinstance(statement, ast.With)
        blocks = [getattr(statement, name, []) for name in ("body", "orelse", "finalbody")]
        held = [s for block in blocks if isinstance(block, list) for s in block]
        waiting += [(s, inner) for s in reversed(held) if isinstance(s, ast.stmt)]


def recorded(code: Code) -> Iterator[Recorded]:
    """Give the calls that record into a sheet, with the texts that stand in them."""
    if code.tree is None:
        return
    for node in ast.walk(code.tree):
        if not isinstance(node, ast.Call):
            continue
        method = last_name(node.func)
        if method in ("line", "given", "check", "decide", "part", "open", "Sheet"):
            texts = [a.value for a in node.args if isinstance(a, ast.Constant)]
            named = {
                k.arg: k.value.value for k in node.keywords
                if k.arg and isinstance(k.value, ast.Constant) and isinstance(k.value.value, str)
            }  # fmt: skip
            held = tuple(text for text in texts if isinstance(text, str))
            if held and len(texts) == len(node.args):
                yield Recorded(code.cell, method, held, named)
