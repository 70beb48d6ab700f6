"""Figures and tables of a record as files of their own: DXF and CSV."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import replace
from typing import Any

from lineproof.drawing import Text, dxf, from_json, words
from lineproof.package.csv_tables import csv_bytes, is_number, safe_cell
from lineproof.record.validate_shown import FILES

_PLAIN = str.maketrans({"−": "-", "\u2009": "", "\u202f": ""})
_LONGEST = 60
_BELOW = 6.0
"""From the lower edge of a figure to its title in the DXF, mm on paper."""


def file_name(calc_id: str) -> str:
    """Return a calc's id as the beginning of a file name.

    >>> file_name("B 7/a")
    'B-7-a'
    """
    plain = "".join(c if c.isascii() and (c.isalnum() or c in "-_.") else "-" for c in calc_id)
    return plain.lstrip(".")[:_LONGEST] or "calc"


def calc_files(record: Mapping[str, Any]) -> dict[str, bytes]:
    """Return the files that a record's figures and tables ask for, by name."""
    return {
        name: table_csv(calc_table(record, entry)) if ending == "csv" else _drawing(record, entry)
        for name, ending, entry in _asked(record)
    }


def calc_file_names(record: Mapping[str, Any]) -> list[str]:
    """Return the names of :func:`calc_files` without making the files."""
    return [name for name, _, _ in _asked(record)]


def _asked(record: Mapping[str, Any]) -> Iterator[tuple[str, str, Mapping[str, Any]]]:
    """Yield name, ending and entry of every file that a record asks for."""
    start = file_name(record["calc"]["id"])
    for part in record["parts"]:
        for entry in part["entries"]:
            ending = FILES.get(entry["kind"], "")
            if ending and entry.get(ending):
                yield f"{start}-{entry[ending]}.{ending}", ending, entry


def _drawing(record: Mapping[str, Any], entry: Mapping[str, Any]) -> bytes:
    """Return a figure as DXF with its calc and title below it.

    Bar marks begin anew in each calc: without its id those of two beams would be one in a drawing.
    """
    figure = from_json(entry["figure"])
    told = f"{record['calc']['id']}: {figure.caption or entry.get('caption') or entry['title']}"
    below = ((figure.width / 2 - figure.origin[0]) / figure.scale,
             (-_BELOW - figure.origin[1]) / figure.scale)  # fmt: skip
    return dxf(replace(figure, shapes=(*figure.shapes, Text(below, words(told)))))


def calc_table(record: Mapping[str, Any], entry: Mapping[str, Any]) -> dict[str, Any]:
    """Return a table with its calc in each row: tables of several beams are put together."""
    calc = record["calc"]["id"]
    rows = [[calc, *row] for row in entry["rows"]]
    return {"columns": ["Calc", *entry["columns"]], "rows": rows}


def table_csv(entry: Mapping[str, Any]) -> bytes:
    """Return a table as CSV, its numbers as a spreadsheet reads them."""
    return csv_bytes(map(_cell, row) for row in (entry["columns"], *entry["rows"]))


def _cell(text: str) -> str:
    """Return a cell, a printed number with a plain minus and without spaces.

    >>> _cell("−12.5"), _cell("=1+1"), _cell("-2+3")
    ('-12.5', "'=1+1", "'-2+3")
    """
    number = text.translate(_PLAIN)
    return number if is_number(number) else safe_cell(text)
