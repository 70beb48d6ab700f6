"""``lineproof audit``: another engineer's claims against a calculation, or a calculation alone."""

from __future__ import annotations

import argparse
import json
import sys
from collections.abc import Mapping, Sequence
from dataclasses import replace
from pathlib import Path
from typing import Any

from lineproof.audit.audit import audit_alone, audit_claims
from lineproof.audit.blank import blank_table
from lineproof.audit.claims import read_claims
from lineproof.audit.data import Audit, Finding
from lineproof.audit.drawing import drawing_blank, drawing_findings
from lineproof.audit.drawing_rows import HEADINGS
from lineproof.audit.findings import importance
from lineproof.audit.graph import Graph
from lineproof.audit.junior import Cell, audit_cells
from lineproof.audit.tables import read_table, write_table
from lineproof.cli.audit_output import as_data, as_text
from lineproof.cli.files import write_all
from lineproof.cli.lines import altered_lines, read_records
from lineproof.errors import UserError
from lineproof.notebook.cells import cells_of, joined, load_notebook
from lineproof.notebook.read import calc_of
from lineproof.record import Record

DONE, FOUND = 0, 1
_MOST_NAMED = 3


def run(options: argparse.Namespace) -> int:
    """Audit a calculation or write a blank table; returns 1 where there is a finding."""
    record = picked(read_records(options.record), options.record, options.calc)
    if options.blank or options.blank_full or options.blank_drawing:
        _write_blank(record, options)
        return DONE
    graph = Graph(record)
    audit = _audit(graph, options)
    if options.into is not None:
        _print(audit, record, options)
    if options.json:
        sys.stdout.write(json.dumps(as_data(audit, graph), indent=1, allow_nan=False) + "\n")
    else:
        sys.stdout.writelines(f"{line}\n" for line in as_text(audit, graph))
    return FOUND if audit.findings else DONE


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


def _write_blank(record: Record, options: argparse.Namespace) -> None:
    """Write a blank table; one that exists may be filled in and is never written over."""
    path: Path = options.blank or options.blank_full or options.blank_drawing
    if path.exists():
        raise UserError(f"{path}: exists already and may be filled in; choose another name")
    try:
        if options.blank_drawing:
            content = write_table(HEADINGS, drawing_blank(record), path.suffix)
        else:
            content = blank_table(Graph(record), path.suffix, full=options.blank_full is not None)
    except UserError as error:
        raise UserError([f"{path}: {fault}" for fault in error.faults]) from None
    write_all({path: content})
    column, option = ("drawn", "drawing") if options.blank_drawing else ("claimed", "claims")
    sys.stdout.write(f"{path}: fill in the column '{column}', then give it as --{option}\n")


def _audit(graph: Graph, options: argparse.Namespace) -> Audit:
    record = graph.record
    if options.claims is None:
        audit = audit_alone(record, _of_notebook(options.record, record))
    else:
        _refuse_altered(record, options.record)
        audit = audit_claims(record, read_claims(graph, options.claims), graph)
    if options.drawing is None:
        return audit
    found = [*audit.findings, *_of_drawing(options.drawing, record)]
    return replace(audit, findings=tuple(sorted(found, key=importance)))


def _of_drawing(path: Path, record: Record) -> tuple[Finding, ...]:
    rows = read_table(path).rows
    try:
        return drawing_findings(record, rows)
    except UserError as error:
        raise UserError([f"{path}: {fault}" for fault in error.faults]) from None


def _print(audit: Audit, record: Record, options: argparse.Namespace) -> None:
    """Print the report into a folder: all its files or none."""
    from lineproof.audit.report import report_files  # noqa: PLC0415 - 0.5 s with all that it prints
    from lineproof.package.files import file_name  # noqa: PLC0415 - with it

    name = f"{file_name(audit.calc)}-audit"
    files = report_files(audit, record, name, checker=options.checker, date=options.date)
    write_all({options.into / file: content for file, content in files.items()})
    told = ", ".join(sorted(files))
    sys.stderr.write(f"{options.into}: {told}\n")


def _refuse_altered(record: Record, path: Path) -> None:
    """Refuse to judge claims by a record that does not follow from its own inputs."""
    altered = altered_lines(record)
    if altered:
        first = "; ".join(altered[:_MOST_NAMED])
        more = f" and {len(altered) - _MOST_NAMED} more" if len(altered) > _MOST_NAMED else ""
        raise UserError(
            f"{path}: {record.calc_id} does not follow from its own inputs ({first}{more}); claims "
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
    cells = [
        Cell(c.number, c.kind, c.source, c.tags, c.count, tuple(map(_text, c.outputs)))
        for c in cells_of(data, str(path))
    ]
    return audit_cells(cells, record, remarks)


def _text(output: Mapping[str, Any]) -> str:
    """Return the text of a cell's output, as it stands there."""
    data = output.get("data", {})
    text = output.get("text", data.get("text/plain", output.get("evalue", "")))
    return joined(text) if isinstance(text, str | list) else ""
