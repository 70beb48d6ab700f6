"""``lineproof audit``: another engineer's claims against a calculation, or a calculation alone."""

from __future__ import annotations

import argparse
import json
import sys
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import Any

from lineproof.audit.audit import audit_alone, audit_claims
from lineproof.audit.blank import blank_table
from lineproof.audit.claims import read_claims
from lineproof.audit.data import Audit, Finding
from lineproof.audit.graph import Graph
from lineproof.audit.junior import Cell, audit_cells
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
    blank = options.blank or options.blank_full
    if blank:
        _write_blank(Graph(record), blank, full=options.blank_full is not None)
        return DONE
    graph = Graph(record)
    audit = _audit(graph, options)
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


def _write_blank(graph: Graph, path: Path, *, full: bool) -> None:
    """Write a blank table; one that exists may hold claims and is never written over."""
    if path.exists():
        raise UserError(f"{path}: exists already and may hold claims; choose another name")
    content = blank_table(graph, path.suffix, full=full)
    write_all({path: content})
    sys.stdout.write(f"{path}: fill in the column 'claimed', then: lineproof audit --claims\n")


def _audit(graph: Graph, options: argparse.Namespace) -> Audit:
    if options.claims is not None:
        _refuse_altered(graph.record, options.record)
        return audit_claims(graph.record, read_claims(graph, options.claims), graph)
    return audit_alone(graph.record, _of_notebook(options.record, graph.record))


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
