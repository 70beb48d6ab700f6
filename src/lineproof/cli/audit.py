"""``lineproof audit``: another engineer's claims against a calculation, or a calculation alone."""

from __future__ import annotations

import argparse
import datetime as dt
import json
import sys
from pathlib import Path

from lineproof.audit.claims.blank import blank_table
from lineproof.audit.claims.tables import write_table
from lineproof.audit.data import Audit
from lineproof.audit.graph import Graph
from lineproof.audit.review.data import Review, Reviewer
from lineproof.audit.review.findings import with_findings
from lineproof.audit.search.drawing import drawing_blank
from lineproof.audit.search.drawing_rows import HEADINGS
from lineproof.cli.audit_output import as_data, as_text
from lineproof.cli.files import write_all
from lineproof.errors import FaultList, UserError
from lineproof.notebook.audited import audited, audited_code, picked
from lineproof.notebook.records import read_records
from lineproof.notebook.reviews import read_review_file, refuse_originators
from lineproof.record import Record
from lineproof.typeset import printable

DONE, FOUND = 0, 1


def run(options: argparse.Namespace) -> int:
    """Audit a calculation or write a blank table; returns 1 where there is a finding."""
    _refuse_idle(options)
    code = None if _asks_for_a_record(options) else audited_code(options.record)
    if code is not None:
        return _told(code, None, options)
    record = picked(read_records(options.record), options.record, options.calc)
    if options.blank or options.blank_full or options.blank_drawing:
        _write_blank(record, options)
        return DONE
    graph = Graph(record)
    audit = audited(graph, options.record, options.claims, options.drawing)
    files = _report(audit, record, options) if options.into is not None else {}
    if options.review is not None:
        files[options.review] = _reviewed(audit, record, options).to_text().encode()
    if files:
        write_all(files)
        sys.stderr.writelines(f"{printable(str(path))}\n" for path in sorted(files))
    return _told(audit, graph, options)


def _asks_for_a_record(options: argparse.Namespace) -> bool:
    """Tell whether what is asked for needs a calc: a table to compare, a report, a review."""
    tables = (options.claims, options.blank, options.blank_full, options.blank_drawing)
    return any((*tables, options.drawing, options.into, options.review, options.calc))


def _told(audit: Audit, graph: Graph | None, options: argparse.Namespace) -> int:
    if options.json:
        sys.stdout.write(json.dumps(as_data(audit, graph), indent=1, allow_nan=False) + "\n")
    else:
        sys.stdout.writelines(f"{line}\n" for line in as_text(audit, graph))
    return FOUND if audit.findings else DONE


def _refuse_idle(options: argparse.Namespace) -> None:
    """Refuse a name or a day that would go nowhere."""
    faults = FaultList()
    if options.date and options.into is None:
        faults.add("--date is the day of a printed report; give --into DIR with it")
    if options.checker and options.into is None and options.review is None:
        faults.add(
            "--checker stands in a report or a review; give --into DIR or --review FILE with it"
        )
    faults.raise_if_any()


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
    name = printable(str(path))
    sys.stdout.write(f"{name}: fill in the column '{column}', then give it as --{option}\n")


def _report(audit: Audit, record: Record, options: argparse.Namespace) -> dict[Path, bytes]:
    """Return the files of the printed report."""
    from lineproof.audit.report import report_files  # noqa: PLC0415 - 0.5 s with all that it prints
    from lineproof.package.files import file_name  # noqa: PLC0415 - with it

    name = f"{file_name(audit.calc)}-audit"
    files = report_files(audit, record, name, checker=options.checker, date=options.date)
    return {options.into / file: content for file, content in files.items()}


def _reviewed(audit: Audit, record: Record, options: argparse.Namespace) -> Review:
    """Return the review with the findings raised in it by the checker."""
    path: Path = options.review
    name = " ".join(options.checker.split())
    if not name:
        raise UserError("--review: findings are raised by a person; give --checker NAME")
    old = read_review_file(path) if path.exists() else Review(record.calc_id)
    if old.calc != record.calc_id:
        raise UserError(f"{path}: is of calc {old.calc[:40]!r}, not of {record.calc_id!r}")
    initials = "".join(word[0] for word in name.split())
    at = dt.datetime.now(dt.UTC).strftime("%Y-%m-%dT%H:%M:%SZ")
    made = with_findings(old, audit, record, Reviewer(name, initials), at)
    refuse_originators(made, record)
    return made
