"""Tables of several calcs of a package: put together as files, quantities added up for print."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from decimal import Decimal
from typing import Any

from lineproof.package.files import calc_table, table_csv
from lineproof.record.entry import TABLE
from lineproof.typeset.nodes import Word
from lineproof.typeset.rows import PrintedTable

PACKAGE_NAME = "package"
"""What the files of several calcs together are called."""
QUANTITIES = "quantities"
"""The file whose tables hold a quantity, its amount and its unit in each row."""
_COLUMNS = ["Quantity", "Amount", "Unit"]
_MOST_CALCS = 6
"""So many calcs have a column each beside their sum; of more, the sum alone is printed."""
_DASH = "–"

Data = Mapping[str, Any]


def joined_files(records: Sequence[Data]) -> dict[str, bytes]:
    """Return each table that several calcs issue alike as one file of all their rows, by name.

    Bars are ordered and bent for a floor, not for a beam: the marks of each stand behind its calc.
    """
    alike: dict[tuple[str, ...], list[Data]] = {}
    for record in records:
        for entry in _issued_tables(record):
            table = calc_table(record, entry)
            alike.setdefault((entry["csv"], *table["columns"]), []).append(table)
    return {
        _joined_name(name): table_csv({
            "columns": columns, "rows": [row for table in tables for row in table["rows"]]
        })
        for (name, *columns), tables in alike.items()
        if len(tables) > 1
    }  # fmt: skip


def joined_names(record: Data) -> list[str]:
    """Return the names of the joined files that a record's tables may stand in."""
    return [_joined_name(entry["csv"]) for entry in _issued_tables(record)]


def total_quantities(records: Sequence[Data]) -> PrintedTable | None:
    """Return the quantities of all calcs and their sums; None where fewer than two have some.

    Sums are of the printed amounts, so that they can be followed; what is so much a unit of
    another amount has no sum.
    """
    found = {
        record["calc"]["id"]: {(name, unit): amount for name, amount, unit in entry["rows"]}
        for record in records
        for entry in _issued_tables(record)
        if entry["csv"] == QUANTITIES and entry["columns"] == _COLUMNS
    }
    if len(found) <= 1:
        return None
    shown = list(found) if len(found) <= _MOST_CALCS else []
    rows = [
        (name, *(found[calc].get((name, unit), _DASH) for calc in shown),
         _sum(amounts.get((name, unit), "0") for amounts in found.values())
         if "/" not in unit else _DASH, unit)
        for name, unit in _in_order(list(amounts) for amounts in found.values())
    ]  # fmt: skip
    columns = ("Quantity", *shown, f"All {len(found)}", "Unit")
    numeric = tuple(place not in (0, len(columns) - 1) for place in range(len(columns)))
    return PrintedTable(tuple(map(Word, columns)), tuple(rows), numeric, ("",) * len(columns))


def _joined_name(name: str) -> str:
    return f"{PACKAGE_NAME}-{name}.csv"


def _issued_tables(record: Data) -> Iterator[Data]:
    """Yield the tables of a record that are issued as files."""
    for part in record["parts"]:
        for entry in part["entries"]:
            if entry["kind"] == TABLE and entry.get("csv"):
                yield entry


def _sum(amounts: Iterable[str]) -> str:
    return f"{sum(map(Decimal, amounts), Decimal(0))}"


def _in_order(lists: Iterable[Sequence[tuple[str, str]]]) -> list[tuple[str, str]]:
    """Merge lists: each item once, one that only some hold right behind what stands before it.

    >>> _in_order([[("10M", "kg"), ("all", "kg")], [("10M", "kg"), ("15M", "kg"), ("all", "kg")]])
    [('10M', 'kg'), ('15M', 'kg'), ('all', 'kg')]
    """
    merged: list[tuple[str, str]] = []
    for items in lists:
        place = 0
        for item in items:
            if item not in merged:
                merged.insert(place, item)
            place = merged.index(item) + 1
    return merged
