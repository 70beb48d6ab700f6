"""Records of the demo calcs, and the same with something taken away or changed by hand."""

from __future__ import annotations

import copy
import re
from collections.abc import Callable
from functools import cache
from pathlib import Path
from typing import Any

from lineproof.notebook.read import read_calc
from lineproof.record import Record

CALCS = Path(__file__).resolve().parents[2] / "calcs"
NAMES = ("edge-beam", "existing-beam", "floor-beam", "tee-section", "validation")
Data = dict[str, Any]


@cache
def demo(name: str) -> Record:
    """Return the record of a stored demo calc; not to be changed in place."""
    return read_calc(CALCS / f"{name}.ipynb").record


def edited(record: Record, edit: Callable[[Data], None]) -> Record:
    """Return a record whose plain data were changed by hand; the given one stays as it is."""
    data = copy.copy(record.data)
    data["parts"] = [
        part | {"entries": [dict(e) for e in part["entries"]]} for part in data["parts"]
    ]
    data["status"] = copy.deepcopy(data["status"])
    edit(data)
    return Record(data)


def without_parts(record: Record, pattern: str) -> Record:
    """Return a record without the parts whose key is like a pattern."""
    like = re.compile(pattern)

    def take(data: Data) -> None:
        data["parts"] = [part for part in data["parts"] if not like.fullmatch(part["key"])]

    return edited(record, take)


def without_entries(record: Record, pattern: str) -> Record:
    """Return a record without the entries whose id is like a pattern."""
    like = re.compile(pattern)

    def take(data: Data) -> None:
        for part in data["parts"]:
            part["entries"] = [e for e in part["entries"] if not like.fullmatch(e["id"])]

    return edited(record, take)


def changed(record: Record, entry_id: str, **fields: Any) -> Record:
    """Return a record in which fields of one entry are others; ``args`` are added to its own."""

    def change(data: Data) -> None:
        entry = next(e for p in data["parts"] for e in p["entries"] if e["id"] == entry_id)
        if "args" in fields:
            fields["args"] = entry.get("args", {}) | fields["args"]
        entry.update(fields)

    return edited(record, change)
