"""Two records of one calculation, line by line, by id."""

from __future__ import annotations

import json
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from itertools import takewhile
from typing import Any

from lineproof.quantity.units import internal_factor
from lineproof.record import Record
from lineproof.record.entry import CRITERIA, FOUND, VALUES
from lineproof.record.recompute import REMAINDER, close

Entry = Mapping[str, Any]

_MADE_FROM = (
    "kind", "formula", "typed", "table", "row", "procedure", "settings", "args", "numbers",
    "clause", "text", "alt", "columns", "rows",
)  # fmt: skip


_LONGEST, _BEFORE = 120, 40
"""Of a text that differs: how much is shown, and how much of it before the place where it does."""


@dataclass(frozen=True, slots=True)
class Change:
    """A line that differs: what of it, as stored and as made again ("" where it is missing)."""

    id: str
    what: str
    stored: str
    again: str

    def __str__(self) -> str:
        """Say which line differs and how."""
        if not self.again:
            return f"{self.id}: stored as {self.stored}, not made again"
        if not self.stored:
            return f"{self.id}: not stored, made as {self.again}"
        return f"{self.id}: {self.what} stored {self.stored}, made again {self.again}"


def compare(stored: Record, again: Record) -> list[Change]:
    """Return every difference of calculation between two records of one calc.

    Numbers count as the same within 1e-9 of their size. Project facts and titles are no part of
    the calculation and are not compared.
    """
    old, new = stored.entries, again.entries
    changes = [
        Change("calc", what, first, second)
        for what, first, second in (
            ("id", stored.calc_id, again.calc_id),
            ("code pair", _pair(stored), _pair(again)),
        )
        if first != second
    ]
    for entry_id, entry in old.items():
        if entry_id in new:
            changes.extend(_changes(entry_id, entry, new[entry_id]))
        else:
            changes.append(Change(entry_id, "line", shown(entry), ""))
    changes.extend(Change(i, "line", "", shown(e)) for i, e in new.items() if i not in old)
    return changes


def _pair(record: Record) -> str:
    return str(record.data["codes"].get("pair", "none"))


def shown(entry: Entry) -> str:
    """Return an entry's value in a few words."""
    if entry["kind"] in VALUES:
        return f"{entry['value']:.10g} {entry['unit']}".rstrip()
    if entry["kind"] in CRITERIA:
        return "holds" if entry["holds"] else "does not hold"
    return str(entry["kind"])


def _changes(entry_id: str, old: Entry, new: Entry) -> Iterator[Change]:
    for what in _MADE_FROM:
        if old.get(what) != new.get(what):
            yield Change(entry_id, what, *_short(old.get(what), new.get(what)))
            if what == "kind":
                return
    if old["kind"] in VALUES and not _same(old, new, "value"):
        yield Change(entry_id, "value", shown(old), shown(new))
    if old["kind"] in CRITERIA:
        yield from _sides(entry_id, old, new)
    if old["kind"] == FOUND:
        for what in ("formula", "args"):
            first, second = old["closing"].get(what), new["closing"].get(what)
            if first != second:
                yield Change(entry_id, f"closing {what}", *_short(first, second))


def _sides(entry_id: str, old: Entry, new: Entry) -> Iterator[Change]:
    # As in recomputing: what a balance leaves is rounding, and another processor leaves another.
    larger = max(abs(entry[side]) for entry in (old, new) for side in ("left", "right"))
    for side in ("left", "right"):
        if not _same(old, new, side, REMAINDER * larger):
            texts = [f"{entry[side]:.10g} {entry['unit']}".rstrip() for entry in (old, new)]
            yield Change(entry_id, f"{side} side", *texts)
    if old["holds"] != new["holds"]:
        yield Change(entry_id, "verdict", shown(old), shown(new))


def _same(old: Entry, new: Entry, what: str, rounding: float = 0.0) -> bool:
    """Tell whether a number is the same; another printed unit is a difference of its own.

    ``rounding`` [printed unit] is what may differ besides the last bits.
    """
    if old["unit"] != new["unit"]:
        return False
    scale = internal_factor(old["unit"])
    return close(old[what] * scale, new[what] * scale, rounding * scale)


def _short(*values: object) -> list[str]:
    """Return each value in a line, from shortly before the place where they part."""
    texts = [v if isinstance(v, str) else json.dumps(v, ensure_ascii=False) for v in values]
    alike = sum(1 for _ in takewhile(lambda them: len(set(them)) == 1, zip(*texts, strict=False)))
    start = max(alike - _BEFORE, 0) if max(map(len, texts)) > _LONGEST else 0
    return [repr("…" * (start > 0) + _cut(text[start:])) for text in texts]


def _cut(text: str) -> str:
    return text if len(text) <= _LONGEST else f"{text[: _LONGEST - 1]}…"
