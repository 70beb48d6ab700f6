"""Lines of the working that are equal, number for number, to earlier ones.

A beam that is alike on both sides is worked twice in the record, since each line rests on entries
of its own. On paper the second working would tell nothing new: where formula, clause, printed
numbers and result of a line are those of an earlier line, its result stands with the number of
that line. A note longer than a line of print that stands word for word in an earlier part names
that part, except beside a check that fails. Nothing is left out of the record, and every line keeps
its label and its anchor.
"""

from __future__ import annotations

import json
import math
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import groupby
from typing import Any

from lineproof.typeset.rows import PrintedRow

Entry = Mapping[str, Any]

_SAME = 1e-9
_SORTED = json.JSONEncoder(sort_keys=True)
_REPEATABLE = frozenset({"given", "lookup", "line", "found", "decision", "check"})
_LONG_NOTE = 110
"""More letters than stand on one line of print."""
_NUMBERS = ("value", "left", "right", "utilisation")
_OWN = frozenset({"id", "label", "title", "digest", "args", "closing", *_NUMBERS})
"""What of an entry is its own, or is compared apart."""


@dataclass(frozen=True, slots=True)
class Repeated:
    """A line, and id and label of the earlier one whose working it repeats.

    The label of a note without a number is that of its part: ``part 44``.
    """

    row: PrintedRow
    id: str
    label: str


@dataclass(frozen=True, slots=True)
class Group:
    """Neighbouring rows of a part: such that are worked, or such that repeat earlier ones."""

    rows: tuple[PrintedRow, ...] = ()
    repeated: tuple[Repeated, ...] = ()


class Worked:
    """The lines that have been worked so far, in the order of print."""

    def __init__(self, marked: Iterable[str]) -> None:
        """Begin with nothing; lines with one of the ids ``marked`` are always worked."""
        self._marked = frozenset(marked)
        self._lines: dict[str, tuple[Entry, str]] = {}

    def groups(
        self, entries: Sequence[Entry], rows: Sequence[PrintedRow], label: str = ""
    ) -> tuple[Group, ...]:
        """Return the rows of the next part in order, those that repeat earlier parts apart.

        ``label`` is that of the part.
        """
        fails = any(_fails(entry) for entry in entries)
        keys = ["" if fails and each["kind"] == "note" else self._key(each) for each in entries]
        told = [
            self._told(entry, row, key) for entry, row, key in zip(entries, rows, keys, strict=True)
        ]
        for entry, key in zip(entries, keys, strict=True):
            if key:
                self._lines.setdefault(key, (entry, entry.get("label") or f"part {label}"))
        return tuple(_grouped(told))

    def _key(self, entry: Entry) -> str:
        """Return all that a line or a note shows, "" for one that is printed in any case."""
        if entry["id"] in self._marked:
            return ""
        if entry["kind"] == "note":
            return _note_key(entry)
        if entry["kind"] not in _REPEATABLE or _fails(entry):
            return ""
        closing = entry.get("closing") or {}
        return _SORTED.encode(
            {name: entry[name] for name in entry if name not in _OWN}
            | {"closing": {name: closing[name] for name in closing if name not in _OWN}}
        )

    def _told(self, entry: Entry, row: PrintedRow, key: str) -> PrintedRow | Repeated:
        seen = self._lines.get(key) if key else None
        if seen is None or not _same_numbers(entry, seen[0]):
            return row
        return Repeated(row, seen[0]["id"], seen[1])


def _fails(entry: Entry) -> bool:
    return entry["kind"] == "check" and not entry["holds"]


def _note_key(note: Entry) -> str:
    """Return what a long note says, "" for a short one."""
    if len(note["text"]) <= _LONG_NOTE:
        return ""
    return _SORTED.encode(
        {name: note[name] for name in note if name not in ("id", "label", "digest")}
    )


def _same_numbers(one: Entry, other: Entry) -> bool:
    """Tell whether the numbers behind two equal prints are equal, but for their last bits."""
    pairs = ((one, other), (one.get("closing") or {}, other.get("closing") or {}))
    return all(
        math.isclose(a[name] or 0.0, b[name] or 0.0, rel_tol=_SAME, abs_tol=_SAME)
        for a, b in pairs
        for name in _NUMBERS
        if name in a and name in b
    )


def _grouped(told: Iterable[PrintedRow | Repeated]) -> Iterator[Group]:
    """Gather neighbours that are told alike."""
    for repeated, items in groupby(told, lambda item: isinstance(item, Repeated)):
        group = tuple(items)
        yield Group(repeated=group) if repeated else Group(rows=group)  # type: ignore[arg-type]
