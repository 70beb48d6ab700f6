"""``lineproof lines``: the recorded lines of a notebook, a package or a record."""

from __future__ import annotations

import argparse
import json
import sys
from collections.abc import Iterable, Mapping
from typing import Any

from lineproof.formula import parse_criterion
from lineproof.notebook.records import altered_lines, altered_shown, read_records
from lineproof.record import Record
from lineproof.record.entry import CRITERIA, VALUES
from lineproof.typeset import printable

MOST_NAMED = 20
_COMMON = ("id", "label", "kind", "symbol", "title", "clause", "basis")
_OWN = ("typed", "source", "table", "row", "numbers", "procedure", "settings", "closing", "holds",
        "left", "right", "utilisation", "conclusion", "exception", "printed", "digest")  # fmt: skip


def run(options: argparse.Namespace) -> int:
    """Print the lines of a file; returns 1 where one does not follow from what it rests on.

    So it does where a notebook shows a part otherwise than it was run.
    """
    records = read_records(options.file)
    if options.json:
        sys.stdout.write(json.dumps(as_json(records), indent=1, allow_nan=False) + "\n")
    else:
        sys.stdout.writelines(f"{line}\n" for line in as_table(records))
    altered = [
        f"{record.calc_id}: {found}" for record in records for found in altered_lines(record)
    ] + [f"{options.file}: {said}" for said in altered_shown(options.file)]
    for sentence in altered[:MOST_NAMED]:
        sys.stderr.write(f"{printable(sentence)}\n")
    if len(altered) > MOST_NAMED:
        sys.stderr.write(f"and {len(altered) - MOST_NAMED} more\n")
    return 1 if altered else 0


def as_json(records: Iterable[Record]) -> dict[str, Any]:
    """Return the lines as plain data: ``calc``, ``digest``, ``lines``.

    ``value`` stands in ``unit``. Of several calcs, ids and digests are joined, and each line
    names its own calc.
    """
    records = list(records)
    return {
        "calc": ", ".join(record.calc_id for record in records),
        "digest": " ".join(record.digest for record in records),
        "lines": [
            _line(record.calc_id, part["key"], entry)
            for record in records
            for part in record.parts
            for entry in part["entries"]
            if entry["kind"] in (*VALUES, *CRITERIA)
        ],
    }


def _line(calc: str, part: str, entry: Mapping[str, Any]) -> dict[str, Any]:
    line = {"calc": calc, "part": part} | {name: entry.get(name, "") for name in _COMMON}
    line |= {
        "value": entry.get("value"),
        "unit": entry.get("unit", ""),
        "formula": entry.get("formula", ""),
        "args": entry.get("args", {}),
    }
    return line | {name: entry[name] for name in _OWN if name in entry}


def as_table(records: Iterable[Record]) -> list[str]:
    """Return the lines as a text table under a heading per calc and per part."""
    lines: list[str] = []
    for record in records:
        title = record.data["calc"].get("title", "")
        lines.append(f"{record.calc_id}  {title}  digest {record.digest}")
        for part in record.parts:
            lines += ["", f"{part.get('label', '')}  {part.get('title', '')}"]
            lines += _columns(
                [_cells(e) for e in part["entries"] if e["kind"] in (*VALUES, *CRITERIA)]
            )
    return [printable(line).rstrip() for line in lines]


def _cells(entry: Mapping[str, Any]) -> tuple[str, ...]:
    printed = entry["printed"]
    if entry["kind"] in VALUES:
        value = f"{printed['result']} {printed['unit']}"
    else:
        sign = parse_criterion(entry["formula"])[1]
        value = f"{printed['left']} {sign} {printed['right']} {printed['unit']}".rstrip()
        value += f": {'holds' if entry['holds'] else 'does not hold'}"
        if printed.get("utilisation"):
            value += f", ratio {printed['utilisation']}"
    return (entry["label"], entry["id"], value.strip(), entry["clause"], entry["title"])


def _columns(rows: list[tuple[str, ...]]) -> list[str]:
    widths = [max(map(len, column)) for column in zip(*rows, strict=True)]
    return [
        "  ".join(cell.ljust(width) for cell, width in zip(row, widths, strict=True))
        for row in rows
    ]
