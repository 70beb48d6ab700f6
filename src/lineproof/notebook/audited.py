"""An audit by files: a stored calculation, another engineer's figures, what a drawing shows."""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING, Any

from lineproof.audit.audit import audit_alone, audit_claims
from lineproof.audit.claims.read import read_claims
from lineproof.audit.claims.tables import read_table
from lineproof.audit.data import Audit, Finding
from lineproof.audit.findings import importance
from lineproof.audit.graph import Graph
from lineproof.audit.junior.search import Cell, audit_cells, formulas_read
from lineproof.audit.search.drawing import drawing_findings
from lineproof.errors import UserError
from lineproof.notebook.cells import Cell as Stored
from lineproof.notebook.cells import cells_of, data_of, joined, load_notebook
from lineproof.notebook.read import calc_of
from lineproof.notebook.records import altered_lines, read_records
from lineproof.record import MIME, Record
from lineproof.sentences import listed

if TYPE_CHECKING:
    from lineproof.sheet import Sheet

_MOST_NAMED = 3
_MOST_LISTED = 20


class CalcAudit:
    """The audit of a calculation on a sheet of its own; each call records and shows its parts."""

    def __init__(self, sheet: Sheet, graph: Graph, audit: Audit) -> None:
        from lineproof.audit.report import Report  # noqa: PLC0415 - 0.5 s with all that it prints

        self.audit = audit
        self._report = Report(sheet, audit, graph)

    def compared(self) -> None:
        """Record what was compared with what, and how many findings and lines there are."""
        self._report.compared()

    def findings(self) -> None:
        """Record the findings by severity, each with its slip and its effects on the checks."""
        self._report.findings()

    def judged(self) -> None:
        """Record every claim with what follows from it and what is right; what was not claimed."""
        self._report.judged()


def audit_of(
    sheet: Sheet,
    calc: str,
    *,
    claims: str | None = None,
    drawing: str | None = None,
    calc_id: str | None = None,
) -> CalcAudit:
    """Audit a stored calculation, whose file is named beside the notebook; none of it is run.

    ``claims`` is a table of what another engineer calculated, ``drawing`` one of what is drawn;
    ``calc_id`` says which calculation of a package of several. Raises :class:`UserError`.
    """
    path = Path(calc)
    graph = Graph(picked(read_records(path), path, calc_id))
    return CalcAudit(
        sheet, graph, audited(graph, path, *(Path(p) if p else None for p in (claims, drawing)))
    )


def audited(graph: Graph, path: Path, claims: Path | None, drawing: Path | None) -> Audit:
    """Return the audit of a record that was read from a file, by claims or by itself."""
    record = graph.record
    if claims is None:
        audit = audit_alone(record, _of_notebook(path, record))
    else:
        _refuse_altered(record, path)
        audit = audit_claims(record, read_claims(graph, claims), graph)
    if drawing is None:
        return audit
    found = [*audit.findings, *_of_drawing(drawing, record)]
    return replace(audit, findings=tuple(sorted(found, key=importance)))


def audited_code(path: Path) -> Audit | None:
    """Return the audit of a notebook of plain Python, read as text; None for another file.

    A notebook with a record is another file, and one that makes a record once it is run.
    """
    if path.suffix.lower() != ".ipynb":
        return None
    cells = cells_of(load_notebook(path), str(path))
    if any(any(data_of(c, MIME)) or _MAKES_RECORDS.search(c.source) for c in cells):
        return None
    read = _as_read(cells)
    notes = [
        _NO_RECORD,
        *map(_listed, _COMPARED, formulas_read(read)),
    ]
    return Audit(path.name, "", (), audit_cells(read), tuple(filter(None, notes)))


_MAKES_RECORDS = re.compile(r"^\s*(?:from|import)\s+lineproof\b", re.MULTILINE)
_NO_RECORD = (
    "It holds no record: its code is read as text. Nothing is worked again, and no check is looked "
    "for."
)
_COMPARED = (
    "Compared with the catalogue, by their names", "Worked out under other names, and not compared",
)  # fmt: skip


def _listed(said: str, names: Sequence[str]) -> str:
    return f"{said}: {listed(names, _MOST_LISTED)}." if names else ""


def picked(records: Sequence[Record], path: Path, calc: str | None) -> Record:
    """Return the one record asked for; raises :class:`UserError` that names them all."""
    ids = [record.calc_id for record in records]
    named = ", ".join(ids)
    if calc is None:
        if len(records) == 1:
            return records[0]
        raise UserError(f"{path}: holds {len(records)} calcs ({named}); say which: --calc {ids[0]}")
    found = [record for record in records if record.calc_id == calc]
    if not found:
        raise UserError(f"{path}: holds no calc {calc!r}; write --calc with one of {named}")
    if len(found) > 1:
        raise UserError(f"{path}: holds the calc {calc!r} {len(found)} times; give its record file")
    return found[0]


def _of_drawing(path: Path, record: Record) -> tuple[Finding, ...]:
    table = read_table(path)
    lacking = [name for name in ("item", "place", "drawn") if name not in table.headings]
    if lacking:
        raise UserError(
            f"{path}: row 1: no heading {', '.join(map(repr, lacking))}; --blank-drawing writes "
            "the table"
        )
    if not any(row.cells.get("drawn") for row in table.rows):
        raise UserError(f"{path}: no row has a value in the column 'drawn'; write one")
    try:
        return drawing_findings(record, table.rows)
    except UserError as error:
        raise UserError([f"{path}: {fault}" for fault in error.faults]) from None


def _refuse_altered(record: Record, path: Path) -> None:
    """Refuse to judge claims by a record that does not follow from its own inputs."""
    altered = altered_lines(record)
    if altered:
        first = listed(altered, _MOST_NAMED, "; ")
        raise UserError(
            f"{path}: {record.calc_id} does not follow from its own inputs ({first}); claims "
            "are judged by a right calculation only, so audit this one without --claims first"
        )


def _of_notebook(path: Path, record: Record) -> tuple[Finding, ...]:
    """Return what is found in the cells of a notebook; nothing for another kind of file."""
    if path.suffix.lower() != ".ipynb":
        return ()
    data = load_notebook(path)
    remarks: Sequence[str] = ()
    try:
        calc_of(data, path.name)
    except UserError as error:
        remarks = error.faults
    return audit_cells(_as_read(cells_of(data, str(path))), record, remarks)


def _as_read(cells: Iterable[Stored]) -> list[Cell]:
    return [
        Cell(c.number, c.kind, c.source, c.tags, c.count, tuple(map(_text, c.outputs)))
        for c in cells
    ]


def _text(output: Mapping[str, Any]) -> str:
    """Return the text of a cell's output, as it stands there."""
    data = output.get("data", {})
    text = output.get("text", data.get("text/plain", output.get("evalue", "")))
    return joined(text) if isinstance(text, str | list) else ""
