"""A junior's own notebook or package, read without running any of its code.

Calls, all pure functions of plain data:

``audit_record(record)`` for a record of any source: every line worked again with the first wrong
one named, own formulas against the catalogue, constants typed for lines, givens that should be
worked out, units that only look right, editions and header data.

``audit_cells(cells, record, remarks)`` for a notebook besides: its code read as text (formulas,
typed values, radians), runs out of order, outputs older than inputs. ``record`` is None where the
notebook holds none that can be read. The caller reads the notebook file and makes the cells::

    Cell(cell.number, cell.kind, cell.source, cell.tags, cell.count, texts_of(cell.outputs))

with the text of every output (``text`` of a stream, ``text/plain`` of data, ``evalue`` of an
error; "" for an output without text), and passes as ``remarks`` the sentences of other checks, such
as cells changed after they were run. Findings come the gravest first.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence

import lineproof.beams  # noqa: F401 - registers the procedures that found values name
from lineproof.audit.data import Finding, Severity
from lineproof.audit.junior.cells import LONGEST_CELL, MOST_CELLS, MOST_CHARACTERS, Cell
from lineproof.audit.junior.code import (
    code_findings,
    is_compared,
    is_worked,
    recorded_findings,
)
from lineproof.audit.junior.editions import editions, header
from lineproof.audit.junior.givens import own_givens
from lineproof.audit.junior.hostile import hostile
from lineproof.audit.junior.lines import own_lines
from lineproof.audit.junior.python import assigned, read_code
from lineproof.audit.junior.recompute import recomputed
from lineproof.audit.junior.scope import Scope, finding
from lineproof.audit.junior.stale import stale
from lineproof.record import Record

__all__ = ["Cell", "audit_cells", "audit_record", "formulas_read"]


def audit_record(record: Record) -> tuple[Finding, ...]:
    """Return what is wrong with a record, the gravest first; nothing of it is run."""
    scope = Scope(record)
    return _sorted([*_of_record(scope), *editions(scope), *header(scope)])


def audit_cells(
    cells: Sequence[Cell], record: Record | None = None, remarks: Iterable[str] = ()
) -> tuple[Finding, ...]:
    """Return what is wrong with a notebook and the record in it, the gravest first.

    Nothing in the cells is run. ``remarks`` are sentences of the caller's own checks on how fresh
    the outputs are; each becomes a finding.
    """
    said = list(remarks)
    found = [finding(Severity.MAJOR, remark) for remark in said]
    read, left = _readable(cells)
    codes = [code for cell in read if (code := read_code(cell)) is not None]
    scope = Scope(record) if record is not None else None
    if scope is not None:
        found += [*_of_record(scope), *editions(scope, read), *header(scope, read)]
    else:
        found += recorded_findings(codes)
    found += [*hostile(codes), *code_findings(codes, scope), *stale(read, codes, scope, said)]
    if left:
        found.append(finding(Severity.OBSERVATION, f"{left} cells are more than are read here"))
    return _sorted(found)


def formulas_read(cells: Sequence[Cell]) -> tuple[tuple[str, ...], tuple[str, ...]]:
    """Return what code works out: names that were compared with the catalogue, and all others."""
    codes = [code for cell in _readable(cells)[0] if (code := read_code(cell)) is not None]
    made = [each for code in codes for each in assigned(code) if is_worked(each)]
    compared = dict.fromkeys(each.name for each in made if is_compared(each))
    others = dict.fromkeys(each.name for each in made if each.name not in compared)
    return tuple(compared), tuple(others)


def _of_record(scope: Scope) -> list[Finding]:
    return [*recomputed(scope.record), *own_lines(scope), *own_givens(scope)]


def _readable(cells: Sequence[Cell]) -> tuple[list[Cell], int]:
    """Return the cells that are read, up to so many and so much text, and how many are left."""
    read: list[Cell] = []
    characters = 0
    for cell in cells[:MOST_CELLS]:
        characters += min(len(cell.source), LONGEST_CELL)
        if characters > MOST_CHARACTERS:
            break
        read.append(cell)
    return read, len(cells) - len(read)


def _sorted(found: Iterable[Finding]) -> tuple[Finding, ...]:
    order = list(Severity)
    return tuple(sorted(dict.fromkeys(found), key=lambda f: order.index(f.severity)))
