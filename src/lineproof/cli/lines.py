"""``lineproof lines``: the recorded lines of a notebook, a package or a record."""

from __future__ import annotations

import argparse
import json
import sys
from collections.abc import Callable, Iterable, Mapping
from pathlib import Path
from typing import Any

from lineproof.errors import UserError
from lineproof.formula import parse_criterion
from lineproof.record import Record
from lineproof.record.entry import CRITERIA, VALUES
from lineproof.typeset import printable

LARGEST_FILE = 64_000_000
MOST_NAMED = 20
_COMMON = ("id", "label", "kind", "symbol", "title", "clause", "basis")
_OWN = ("typed", "source", "table", "row", "numbers", "procedure", "settings", "closing", "holds",
        "left", "right", "utilisation", "conclusion", "exception", "printed", "digest")  # fmt: skip


def run(options: argparse.Namespace) -> int:
    """Print the lines of a file; returns 1 where one does not follow from what it rests on."""
    records = read_records(options.file)
    if options.json:
        sys.stdout.write(json.dumps(as_json(records), indent=1, allow_nan=False) + "\n")
    else:
        sys.stdout.writelines(f"{line}\n" for line in as_table(records))
    altered = [
        f"{record.calc_id}: {found}" for record in records for found in altered_lines(record)
    ]
    for sentence in altered[:MOST_NAMED]:
        sys.stderr.write(f"{printable(sentence)}\n")
    if len(altered) > MOST_NAMED:
        sys.stderr.write(f"and {len(altered) - MOST_NAMED} more\n")
    return 1 if altered else 0


def altered_lines(record: Record) -> list[str]:
    """Return a sentence per line that its own formula and givens do not give.

    A record says what it was computed from, so one that was changed by hand gives itself away.
    """
    # Importing them registers the procedures by which found values are found again.
    import lineproof.beams  # noqa: PLC0415 - to recompute only
    import lineproof.standards.catalogue  # noqa: F401, PLC0415 - 0.1 s, to recompute only
    from lineproof.record import recompute  # noqa: PLC0415 - with it

    return [str(difference) for difference in recompute(record)]


def read_records(path: Path) -> list[Record]:
    """Read the records of a file by its kind; raises :class:`UserError` that names the file."""
    readers: dict[str, Callable[[Path], list[Record]]] = {
        ".ipynb": _from_notebook, ".pdf": _from_pdf, ".html": _from_html, ".json": _from_json,
    }  # fmt: skip
    reader = readers.get(path.suffix.lower())
    if reader is None:
        raise UserError(f"{path}: not a file with lines; give one of {', '.join(readers)}")
    try:
        return reader(path)
    except OSError as error:
        raise UserError(f"{path}: cannot be read ({error.strerror})") from None
    except UnicodeDecodeError:
        raise UserError(f"{path}: not UTF-8 text; give a file that lineproof has made") from None
    except UserError as error:
        named = [f if str(path) in f else f"{path}: {f}" for f in error.faults]
        raise UserError(named) from None


def _from_notebook(path: Path) -> list[Record]:
    from lineproof.notebook.cells import cells_of, load_notebook  # noqa: PLC0415 - by kind of file
    from lineproof.notebook.read import record_of  # noqa: PLC0415 - by kind of file

    return [record_of(cells_of(load_notebook(path), str(path)), str(path))]


def _content(path: Path) -> bytes:
    """Read a file, never more than a package could hold."""
    with path.open("rb") as stream:
        content = stream.read(LARGEST_FILE + 1)
    if len(content) > LARGEST_FILE:
        raise UserError(f"{path}: larger than {LARGEST_FILE // 1_000_000} MB; not read")
    return content


def _from_pdf(path: Path) -> list[Record]:
    from lineproof.package import records_in_pdf  # noqa: PLC0415 - by kind of file

    return [Record.from_data(data) for data in records_in_pdf(_content(path))]


def _from_html(path: Path) -> list[Record]:
    from lineproof.package import records_in_html  # noqa: PLC0415 - by kind of file

    return [Record.from_data(data) for data in records_in_html(_content(path).decode())]


def _from_json(path: Path) -> list[Record]:
    return [Record.from_text(_content(path).decode())]


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
