"""Code that reaches beyond a calculation, and cells that cannot be read as code."""

from __future__ import annotations

import ast
import re
from collections.abc import Iterator, Sequence

from lineproof.audit.data import Finding, Severity
from lineproof.audit.junior.arithmetic import last_name
from lineproof.audit.junior.python import Code
from lineproof.audit.junior.scope import finding
from lineproof.sentences import listed

_BARE = frozenset(["eval", "exec", "compile", "__import__", "globals", "get_ipython"])
"""Functions of Python by which code does more than calculate."""
_CALLS = frozenset(
    ["system", "popen", "Popen", "check_output", "check_call", "rmtree", "unlink", "urlopen",
     "urlretrieve", "run_cell_magic", "run_line_magic", "write_text", "write_bytes"]
)  # fmt: skip
"""Functions of libraries that reach outside."""
_MODULES = frozenset(
    ["subprocess", "socket", "ctypes", "shutil", "requests", "urllib", "http", "ftplib", "pickle",
     "marshal", "importlib", "pty", "multiprocessing", "smtplib"]
)  # fmt: skip
_COMMAND = re.compile(r"^\s*(!|%%(?:bash|sh|cmd|script|perl|ruby|writefile|system)|%(?:sx|system))")
_OTHER_FILE = re.compile(r"^\s*%(?:run|load|loadpy|load_ext)\s")
_DOUBLE = ("__version__", "__name__", "__doc__", "__file__")
_LONGEST = 60
_MOST = 20


def hostile(codes: Sequence[Code]) -> Iterator[Finding]:
    """Give cells that could not be read, commands of the system, and code that reaches outside."""
    for code in codes:
        if code.fault:
            yield finding(
                Severity.OBSERVATION,
                f"{code.cell.name}: {code.fault}; the cell is not read",
                advice="read it yourself",
            )
        yield from _lines(code)
        yield from _calls(code)


def _lines(code: Code) -> Iterator[Finding]:
    lines = code.cell.source.split("\n")
    commands = [line.strip()[:_LONGEST] for line in lines if _COMMAND.match(line)]
    if commands:
        yield finding(
            Severity.MAJOR,
            f"{code.cell.name}: gives a command to the system: {listed(commands[:_MOST], 3)}; it "
            "was not run",
            advice="ask what it is for; do not run the notebook before you know",
        )
    others = [line.strip()[:_LONGEST] for line in lines if _OTHER_FILE.match(line)]
    if others:
        yield finding(
            Severity.MINOR,
            f"{code.cell.name}: {listed(others[:_MOST], 3)} brings in code from elsewhere, which "
            "was not read",
            advice="ask for the file, or for the code in the notebook",
        )


def _calls(code: Code) -> Iterator[Finding]:
    if code.tree is None:
        return
    found = list(dict.fromkeys(name for node in ast.walk(code.tree) for name in _beyond(node)))
    if found:
        yield finding(
            Severity.MAJOR,
            f"{code.cell.name}: {listed(found[:_MOST])} does more than calculate; it was not run",
            advice="read the cell before you run the notebook",
        )


def _beyond(node: ast.AST) -> Iterator[str]:
    """Give the names in a node by which code does more than calculate."""
    match node:
        case ast.Call(func=ast.Name(id=name)) if name in _BARE:
            yield name
        case ast.Call(func=ast.Name(id="open"), args=[_, ast.Constant(value=str() as mode), *_]):
            if set(mode) & set("wax+"):
                yield "open for writing"
        case ast.Call(func=func) if last_name(func) in _CALLS:
            yield last_name(func)
        case ast.Import(names=names):
            yield from (n.name for n in names if n.name.split(".")[0] in _MODULES)
        case ast.ImportFrom(module=str() as module) if module.split(".")[0] in _MODULES:
            yield module
        case ast.Attribute(attr=name) if name.startswith("__") and name not in _DOUBLE:
            yield name
