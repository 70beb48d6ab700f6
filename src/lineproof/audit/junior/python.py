"""Python code of a notebook read as text: what it assigns, records and calls. Nothing is run."""

from __future__ import annotations

import ast
import re
import warnings
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, field

from lineproof.audit.junior.arithmetic import last_name, symbol_of, tree_of
from lineproof.audit.junior.cells import CODE, LONGEST_CELL, Cell
from lineproof.audit.junior.when import When, walked
from lineproof.formula import Tree

_MAGIC = re.compile(r"(\s*)(?:[%!?]|[\w.]+\?{1,2}\s*$)")
_MOST_LINES = 20
_LONGEST_TEXT = 400


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
    """A call that records into a sheet: its method, the texts given, those named by keyword.

    ``when`` tells whether it is run with its cell.
    """

    cell: Cell
    method: str
    texts: tuple[str, ...]
    named: dict[str, str] = field(default_factory=dict)
    when: When = When.ALWAYS


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
    source = cell.source.replace("\r\n", "\n").replace("\r", "\n").replace("\f", " ")
    code = _parsed(cell, source)
    if code.tree is None and any(map(_MAGIC.match, source.split("\n"))):
        code = _parsed(cell, "\n".join(map(_without_magic, source.split("\n"))))
    return code


def _parsed(cell: Cell, source: str) -> Code:
    try:
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")
            return Code(cell, ast.parse(source), source)
    except SyntaxError as error:
        return Code(cell, None, "", f"no Python that can be read, line {error.lineno or 1}")
    except (ValueError, RecursionError, MemoryError):
        return Code(cell, None, "", "nested too deeply or damaged")


def _without_magic(line: str) -> str:
    found = _MAGIC.match(line)
    return f"{found[1]}pass" if found else line


def assigned(code: Code) -> Iterator[Assigned]:
    """Give the assignments of a cell in order."""
    lines = code.source.split("\n")
    for statement, plain, function in _statements(code):
        for target, value in _bound(statement, function):
            text = written(lines, value) if hasattr(value, "lineno") else ""
            typed = value.value if isinstance(value, ast.Constant) else None
            end = statement.end_lineno, statement.end_col_offset
            _, _, comment = _cut(lines, *end).partition("#")
            made = value.body if isinstance(value, ast.Lambda) else value
            yield Assigned(
                code.cell, target, symbol_of(target), text, tree_of(made),
                typed if isinstance(typed, str) else "", comment.strip(), plain and made is value,
            )  # fmt: skip


def written(lines: Sequence[str], node: ast.expr) -> str:
    """Return an expression as it is written, cut where it is long; ``lines`` are the source's."""
    first, last = node.lineno, node.end_lineno or node.lineno
    if not 0 < first <= last <= len(lines):
        return ""
    end = lines[last - 1].encode()[: node.end_col_offset].decode(errors="replace")
    start = len(lines[first - 1].encode()[: node.col_offset].decode(errors="replace"))
    held = [*lines[first - 1 : min(last - 1, first + _MOST_LINES)], end]
    held[0] = held[0][start:]
    return " ".join(" ".join(held).split())[:_LONGEST_TEXT]


def _cut(lines: Sequence[str], line: int | None, column: int | None) -> str:
    """Return what stands behind a place in its line."""
    if not line or line > len(lines):
        return ""
    return lines[line - 1].encode()[column or 0 :].decode(errors="replace")


def _bound(statement: ast.stmt, function: str) -> Iterator[tuple[str, ast.expr]]:
    """Give the names that a statement sets, each with what it is set to as far as text shows it.

    What a function gives back is given under the name of the function.
    """
    match statement:
        case ast.Assign(targets=targets, value=value):
            for target in targets:
                yield from _matched(target, value)
        case ast.AnnAssign(target=ast.Name(id=name), value=ast.expr() as value):
            yield name, value
        case ast.Return(value=ast.expr() as value) if function:
            yield function, value
        case ast.AugAssign(target=target) | ast.For(target=target) | ast.AsyncFor(target=target):
            yield from _matched(target, _UNKNOWN)
        case ast.With(items=items) | ast.AsyncWith(items=items):
            for item in items:
                yield from _matched(item.optional_vars, _UNKNOWN)


_UNKNOWN = ast.Constant(None)


def _matched(target: ast.expr | None, value: ast.expr) -> Iterator[tuple[str, ast.expr]]:
    """Give names and values of ``b, h = 350, 650``; of what is exchanged no value is known."""
    match target, value:
        case ast.Name(id=name), _:
            yield name, value
        case ast.Tuple(elts=targets) | ast.List(elts=targets), _:
            set_here = {n.id for n in ast.walk(target) if isinstance(n, ast.Name)}
            used = {n.id for n in ast.walk(value) if isinstance(n, ast.Name)}
            held = value.elts if isinstance(value, ast.Tuple | ast.List) else []
            alike = len(held) == len(targets) and not set_here & used
            alike = alike and not any(isinstance(e, ast.Starred) for e in (*held, *targets))
            for each, its in zip(
                targets, held if alike else [_UNKNOWN] * len(targets), strict=True
            ):
                yield from _matched(each, its)
        case ast.Starred(value=inner), _:
            yield from _matched(inner, _UNKNOWN)


def _statements(code: Code) -> Iterator[tuple[ast.stmt, bool, str]]:
    """Give statements in order, whether they run once, and the function in which they stand.

    Loops and branches may run often or never.
    """
    waiting = [(s, True, "") for s in reversed(code.tree.body)] if code.tree else []
    while waiting:
        statement, plain, function = waiting.pop()
        yield statement, plain, function
        inner = plain and isinstance(statement, ast.With)
        if isinstance(statement, ast.FunctionDef | ast.AsyncFunctionDef):
            function = statement.name
        elif isinstance(statement, ast.ClassDef):
            function = ""
        blocks = [getattr(statement, name, []) for name in ("body", "orelse", "finalbody")]
        held = [s for block in blocks if isinstance(block, list) for s in block]
        waiting += [(s, inner, function) for s in reversed(held) if isinstance(s, ast.stmt)]


def recorded(code: Code) -> Iterator[Recorded]:
    """Give the calls that record into a sheet, with the texts that stand in them."""
    if code.tree is None:
        return
    for node, when in walked(code.tree):
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
                yield Recorded(code.cell, method, held, named, when)
