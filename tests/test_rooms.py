"""The order of the rooms: each imports only from rooms above it, inside functions too."""

from __future__ import annotations

import ast
from pathlib import Path

import pytest

PACKAGE = Path(__file__).resolve().parents[1] / "src" / "lineproof"
ROOMS = (
    "quantity", "formula", "record", "drawing", "sheet", "standards", "beams", "typeset",
    "package", "audit", "notebook", "cli",
)  # fmt: skip
FREE = ("errors", "resources", "sentences")
"""Modules without dependencies, open to every room."""
FACADE = ("__init__", "__main__")
"""What stands above all rooms: the names a notebook uses, and ``python -m lineproof``."""
MODULES = sorted(PACKAGE.rglob("*.py"))
TEST_FILES = {path.name for path in Path(__file__).parent.rglob("test_*.py")}


def module_name(path: Path) -> str:
    """Return the dotted name of a module: ``lineproof.record.entry``."""
    parts = path.relative_to(PACKAGE.parent).with_suffix("").parts
    return ".".join(parts[:-1] if parts[-1] == "__init__" else parts)


NAMES = {module_name(path) for path in MODULES}


def room_of(name: str) -> str:
    """Return the room of a dotted name; the facade's is ``__init__``."""
    pieces = name.split(".")
    return pieces[1] if len(pieces) > 1 else "__init__"


def imported(path: Path, source: str) -> set[str]:
    """Return every module of the package that a module names in an import, wherever it stands."""
    own = module_name(path).split(".")
    package = own if path.name == "__init__.py" else own[:-1]
    found: set[str] = set()
    for node in ast.walk(ast.parse(source)):
        if isinstance(node, ast.Import):
            found |= {alias.name for alias in node.names}
        elif isinstance(node, ast.ImportFrom):
            above = package[: len(package) - node.level + 1] if node.level else []
            base = ".".join([*above, *([node.module] if node.module else [])])
            inner = {f"{base}.{alias.name}" for alias in node.names}
            # `from lineproof import record` names a module, `from lineproof.record import X` not.
            found |= (inner & NAMES) | ({base} if inner - NAMES else set())
        elif isinstance(node, ast.Constant) and node.value in NAMES and node.value != "lineproof":
            found.add(node.value)  # import_module("lineproof.package")
    return {name for name in found if name.split(".")[0] == "lineproof"}


def allowed(room: str, other: str) -> bool:
    """Tell whether a room may import from another."""
    if room in FACADE or other in FREE or other == room:
        return True
    if room in FREE:
        return False
    return other in ROOMS and ROOMS.index(other) < ROOMS.index(room)


def test_every_module_belongs_to_a_room() -> None:
    assert {room_of(name) for name in NAMES} <= {*ROOMS, *FREE, *FACADE}
    top = {path.stem for path in PACKAGE.glob("*.py")}
    assert top <= {*ROOMS, *FREE, *FACADE}


@pytest.mark.parametrize("path", MODULES, ids=lambda p: str(p.relative_to(PACKAGE)))
def test_a_room_imports_only_from_rooms_above_it(path: Path) -> None:
    room = room_of(module_name(path))
    wrong = {
        other
        for other in imported(path, path.read_text(encoding="utf-8"))
        if not allowed(room, room_of(other))
    }
    assert not wrong, f"{module_name(path)} may not import {sorted(wrong)}"


def test_no_module_imports_itself_in_a_circle() -> None:
    graph = {
        module_name(path): {
            name for name in imported(path, path.read_text(encoding="utf-8")) if name in NAMES
        }
        for path in MODULES
    }
    done: set[str] = set()

    def visit(name: str, trail: tuple[str, ...]) -> None:
        assert name not in trail, " -> ".join((*trail[trail.index(name) :], name))
        if name not in done:
            for other in graph[name]:
                visit(other, (*trail, name))
            done.add(name)

    for name in graph:
        visit(name, ())


@pytest.mark.parametrize(
    ("source", "found"),
    [
        ("import lineproof.cli", {"lineproof.cli"}),
        ("def f():\n    from lineproof.package import model", {"lineproof.package.model"}),
        ("from lineproof import cli", {"lineproof.cli"}),
        ("from ..record import Entry", {"lineproof.record"}),
        ("from . import units", {"lineproof.quantity.units"}),
        ("import_module('lineproof.sheet')", {"lineproof.sheet"}),
        (
            "if TYPE_CHECKING:\n    from lineproof.sheet.sheet import Sheet",
            {"lineproof.sheet.sheet"},
        ),
        ("import json\nfrom pathlib import Path", set()),
    ],
)
def test_no_import_escapes_the_eye(source: str, found: set[str]) -> None:
    assert imported(PACKAGE / "quantity" / "digits.py", source) == found


def test_the_order_itself() -> None:
    assert allowed("sheet", "record")
    assert not allowed("record", "sheet")
    assert not allowed("errors", "quantity")
    assert not allowed("quantity", "__init__")
    assert allowed("cli", "resources")


def test_no_test_module_is_imported_by_another() -> None:
    """What several of them use stands in a plain module: else its tests and fixtures leak."""
    found = []
    for path in Path(__file__).parent.rglob("*.py"):
        for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
            if isinstance(node, ast.Import | ast.ImportFrom):
                module = node.module or "" if isinstance(node, ast.ImportFrom) else ""
                names = ".".join([module, *(alias.name for alias in node.names)]).split(".")
                files = (f"{name}.py" for name in names if name.startswith("test_"))
                found += [(path.name, name) for name in files if name in TEST_FILES]
    assert found == []
