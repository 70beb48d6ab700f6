"""Checking the form of a record: every field that a reader relies on, and nothing run."""

from __future__ import annotations

import re
from collections.abc import Mapping
from functools import lru_cache
from typing import Any, get_args

from lineproof.errors import FaultList, UserError
from lineproof.formula import System, names_of, parse_criterion, parse_line
from lineproof.formula.notation import check_id
from lineproof.quantity.units import UNITS
from lineproof.record.entry import (
    CHECK,
    CRITERIA,
    DECISION,
    FIGURE,
    FOUND,
    GIVEN,
    LINE,
    LOOKUP,
    NOTE,
    TABLE,
    VALUES,
)
from lineproof.record.plain_data import (
    Fields,
    are_number_texts,
    check_texts,
    is_number,
    is_number_text,
    need,
    shown,
)
from lineproof.record.validate_shown import FILES, check_placing, check_table

Data = Mapping[str, Any]
_USED = frozenset(VALUES)
_SHOWN = frozenset((*VALUES, *CRITERIA))
_PIECE = re.compile(r"[A-Za-z0-9][A-Za-z0-9_-]{0,79}\Z")
"""A key or a symbol in the id of an entry."""
_MOST_KEPT = 8192
_ENTRY = Fields(
    id=str, kind=str, symbol=str, label=str, title=str, clause=str, basis=str, digest=str
)
_GIVEN = Fields(typed=str, source=str, printed=dict)
_LOOKUP = Fields(table=str, row=str, source=str, printed=dict)
_LINE = Fields(formula=str, args=dict, numbers=dict, system=str, printed=dict)
_CRITERION = Fields(numbers=dict, system=str, conclusion=str)
_COMPARISON = Fields(formula=str, args=dict, holds=bool, unit=str, printed=dict)
_FOUND = Fields(procedure=dict, settings=dict, args=dict, closing=dict, printed=dict)
_SYSTEMS = get_args(System)


def check_record(data: Data) -> None:
    """Raise :class:`UserError` with everything that is wrong with the form of plain data."""
    need(
        data, "record", calc=dict, kind_of_member=str, project=dict, codes=dict, notation=list,
        parts=list, confirm=list, status=dict, digest=str, seal=str,
    )  # fmt: skip
    need(data["calc"], "calc", id=str, title=str)
    faults = FaultList()
    entries = _Entries(faults)
    for part in data["parts"]:
        entries.check_part(part)
    for check in (lambda _: entries.check_closings(), _check_head, _check_tail):
        try:
            check(data)
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()


def _check_head(data: Data) -> None:
    if not all(isinstance(text, str) for text in data["codes"].values()):
        raise UserError("record: 'codes' holds something else than text")
    seen = set()
    for row in data["notation"]:
        need(
            _row(row, "notation"), "notation",
            id=str, base=str, sub=str, sup=str, meaning=str, unit=str,
        )  # fmt: skip
        if check_id(row["id"]) in seen or row["unit"] not in UNITS:
            raise UserError(f"record: notation: {row['id']} stands twice or has no known unit")
        seen.add(row["id"])


def _check_tail(data: Data) -> None:
    for row in data["confirm"]:
        need(
            _row(row, "confirm"), "confirm",
            clause=str, what=str, basis=str, confirmed=str, lines=list,
        )  # fmt: skip
        check_texts(row["lines"], "confirm")
    status = data["status"]
    need(status, "status", scope=str, not_covered=list, failed=list)
    check_texts(status["failed"], "status")
    for row in status["not_covered"]:
        need(_row(row, "status"), "status", check=str, clause=str)


def _row(row: object, what: str) -> Data:
    if not isinstance(row, dict):
        raise UserError(f"record: {what} holds {shown(row)} instead of a row")
    return row


class _Entries:
    """Checks the entries in order: each may rest only on values that stand before it."""

    def __init__(self, faults: FaultList) -> None:
        self.faults = faults
        self.kinds: dict[str, str] = {}
        self.closings: list[tuple[str, Data]] = []
        self.parts: set[str] = set()
        self.files: dict[str, str] = {}

    def check_part(self, part: object) -> None:
        """Check one part with all its entries."""
        try:
            row = _row(part, "parts")
            need(row, "part", key=str, label=str, title=str, entries=list)
        except UserError as error:
            self.faults.take(error)
            return
        if row["key"] in self.parts:
            self.faults.add(f"record: part {row['key'][:40]!r} stands twice")
        self.parts.add(row["key"])
        what = f"part {row['key'][:40]!r}"
        for entry in row["entries"]:
            try:
                self._check(_row(entry, what), row["key"])
            except UserError as error:
                self.faults.take(error)

    def _check(self, entry: Data, key: str) -> None:
        _ENTRY.need(entry, "entry")
        entry_id, kind, symbol = entry["id"], entry["kind"], entry["symbol"]
        known = kind in _CHECKS and _is_piece(key) and _is_piece(symbol)
        if not known or entry_id != f"{key}/{symbol}":
            raise UserError(f"record: {entry_id[:80]!r} of kind {kind[:20]!r} is not an entry")
        if entry_id in self.kinds:
            raise UserError(f"record: {entry_id} stands twice")
        if "args" in entry:
            # A table may show checks, line by line.
            self._arguments(entry_id, entry["args"], _SHOWN if kind == TABLE else _USED)
        self.kinds[entry_id] = kind
        if kind in VALUES:
            check_id(symbol)
            unit = entry.get("unit")
            known = isinstance(unit, str) and unit in UNITS
            if not known or not is_number(entry.get("value")):
                raise UserError(f"record: {entry_id} has no finite value in a known unit")
        _CHECKS[kind](entry_id, entry)
        if kind == FOUND:
            self.closings.append((key, entry))
        if kind in FILES:
            self._file(entry_id, entry, FILES[kind])

    def check_closings(self) -> None:
        """Check what closes found values: entries before them, or found with them in their part."""
        order = {entry_id: place for place, entry_id in enumerate(self.kinds)}
        for key, entry in self.closings:
            self._arguments(entry["id"], entry["closing"]["args"])
            for target in entry["closing"]["args"].values():
                together = self.kinds[target] == FOUND and target.startswith(f"{key}/")
                if order[target] > order[entry["id"]] and not together:
                    raise UserError(
                        f"record: {entry['id']} is closed by {target}, which follows it"
                    )

    def _arguments(self, entry_id: str, args: object, kinds: frozenset[str] = _USED) -> None:
        if not isinstance(args, dict):
            raise UserError(f"record: {entry_id}: 'args' is not a dict")
        try:
            if kinds.issuperset(map(self.kinds.get, args.values())):
                return
        except TypeError:  # one rests on a list
            pass
        for target in args.values():
            kind = self.kinds.get(target) if isinstance(target, str) else None
            if kind is None:
                raise UserError(
                    f"record: {entry_id} rests on {shown(target)}, which does not stand before it"
                )
            if kind not in kinds:
                raise UserError(f"record: {entry_id} rests on {target}, which is no value")

    def _file(self, entry_id: str, entry: Data, ending: str) -> None:
        """Refuse a second file of one name; some disks do not tell B from b."""
        stem = entry.get(ending)
        if stem is not None:
            name = f"{stem.casefold()}.{ending}"
            if name in self.files:
                raise UserError(
                    f"record: {entry_id}: {self.files[name]} is also called {ending}={stem!r}; "
                    "give each file its own name"
                )
            self.files[name] = entry_id


@lru_cache(maxsize=_MOST_KEPT)
def _is_piece(text: str) -> bool:
    return _PIECE.match(text) is not None


def _given(entry_id: str, entry: Data) -> None:
    _GIVEN.need(entry, entry_id)
    printed, unit = entry["printed"], entry["unit"]
    _printed_value(entry_id, printed, unit)
    if "typed" in printed:
        _printed_number(entry_id, printed["typed"], printed.get("typed_unit"), unit)


def _lookup(entry_id: str, entry: Data) -> None:
    _LOOKUP.need(entry, entry_id)
    _printed_value(entry_id, entry["printed"], entry["unit"])


def _line(entry_id: str, entry: Data) -> None:
    _LINE.need(entry, entry_id)
    _, tree = parse_line(entry["formula"])
    _names(entry_id, entry, names_of(tree))
    _printed_value(entry_id, entry["printed"], entry["unit"])
    _printed_args(entry_id, entry)
    if entry["printed"].get("coherent") is not None:
        need(entry["printed"], entry_id, coherent=dict)
        _printed_value(entry_id, entry["printed"]["coherent"], entry["unit"])
    _system(entry_id, entry)


def _criterion(entry_id: str, entry: Data) -> None:
    _CRITERION.need(entry, entry_id)
    _system(entry_id, entry)
    _comparison(entry_id, entry)
    if entry["kind"] != CHECK:
        return
    if entry.get("utilisation") is not None:
        printed = entry["printed"].get("utilisation")
        if not is_number(entry["utilisation"]) or not is_number_text(printed):
            raise UserError(f"record: {entry_id}: the utilisation is not a number")
    if entry.get("leads") is not None:
        need(entry, entry_id, leads=bool)
    if entry.get("exception") is not None:
        need(entry, entry_id, exception=dict)
        need(entry["exception"], entry_id, reason=str, initials=str)


def _comparison(entry_id: str, entry: Data) -> None:
    _COMPARISON.need(entry, entry_id)
    left, _, right = parse_criterion(entry["formula"])
    _names(entry_id, entry, (*names_of(left), *names_of(right)))
    if not (is_number(entry.get("left")) and is_number(entry.get("right"))):
        raise UserError(f"record: {entry_id} compares something that is no finite number")
    printed = entry["printed"]
    for side in ("left", "right"):
        _printed_number(entry_id, printed.get(side), printed.get("unit"), entry["unit"])
    _printed_args(entry_id, entry)


def _found(entry_id: str, entry: Data) -> None:
    _FOUND.need(entry, entry_id)
    need(entry["procedure"], entry_id, name=str, version=int, title=str)
    if not all(is_number(value) for value in entry["settings"].values()):
        raise UserError(f"record: {entry_id}: a setting is not a number")
    _printed_value(entry_id, entry["printed"], entry["unit"])
    _printed_args(entry_id, entry)
    closing = entry["closing"]
    _comparison(entry_id, closing)
    if closing.get("system", "N-mm") not in _SYSTEMS:
        raise UserError(f"record: {entry_id}: the system of its closing criterion is damaged")


def _figure(entry_id: str, entry: Data) -> None:
    need(entry, entry_id, figure=dict, alt=str, caption=str)
    check_placing(entry_id, entry)


def _note(entry_id: str, entry: Data) -> None:
    need(entry, entry_id, text=str)


_CHECKS = {
    GIVEN: _given, LOOKUP: _lookup, LINE: _line, FOUND: _found,
    DECISION: _criterion, CHECK: _criterion, FIGURE: _figure, NOTE: _note, TABLE: check_table,
}  # fmt: skip


def _names(entry_id: str, entry: Data, names: tuple[str, ...]) -> None:
    missing = entry["args"].keys() ^ names if tuple(entry["args"]) != names else ()
    if missing:
        raise UserError(
            f"record: {entry_id}: {min(missing)[:40]!r} is not both in its formula and its args"
        )


def _printed_args(entry_id: str, entry: Data) -> None:
    texts = entry["printed"].get("args")
    if not isinstance(texts, dict) or texts.keys() != entry["args"].keys():
        raise UserError(f"record: {entry_id}: not every argument is printed")
    if not are_number_texts(texts.values()):
        raise UserError(f"record: {entry_id}: a printed argument is not a number")


def _printed_value(entry_id: str, printed: Data, unit: str) -> None:
    _printed_number(entry_id, printed.get("result"), printed.get("unit"), unit)


def _printed_number(entry_id: str, text: object, shown_unit: object, unit: str) -> None:
    if not is_number_text(text):
        raise UserError(f"record: {entry_id}: printed {shown(text)} is not a number")
    known = isinstance(shown_unit, str) and shown_unit in UNITS and unit in UNITS
    if not known or (shown_unit != unit and UNITS[str(shown_unit)].kind != UNITS[unit].kind):
        raise UserError(f"record: {entry_id}: {shown(shown_unit)} is not a unit of its kind")


def _system(entry_id: str, entry: Data) -> None:
    numbers = entry["numbers"]
    texts = not numbers or all(isinstance(unit, str) for unit in numbers.values())
    if entry["system"] not in _SYSTEMS or not texts:
        raise UserError(f"record: {entry_id}: its system or its constants' units are damaged")
