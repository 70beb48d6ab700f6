"""The record: plain JSON, read back with every formula checked and nothing run."""

from __future__ import annotations

import json
import math
import re
from collections.abc import Iterator
from functools import cached_property
from typing import Any

from lineproof.errors import FaultList, UserError
from lineproof.formula import parse_criterion, parse_line
from lineproof.quantity.units import UNITS
from lineproof.record.build import SCHEMA
from lineproof.record.entry import CRITERIA, FIGURE, FOUND, GIVEN, LINE, LOOKUP, NOTE, TABLE, VALUES

MIME = "application/vnd.lineproof.record+json"
LARGEST_RECORD = 32_000_000
_ID = re.compile(r"[A-Za-z0-9][A-Za-z0-9_-]{0,79}/[A-Za-z0-9][A-Za-z0-9_-]{0,79}\Z")
_KINDS = (*VALUES, *CRITERIA, FIGURE, NOTE, TABLE)


class Record:
    """A closed calculation.

    ``data`` is plain JSON data; ``entries`` holds its entries by id, in order.
    """

    def __init__(self, data: dict[str, Any]) -> None:
        self.data = data

    @classmethod
    def from_text(cls, text: str) -> Record:
        """Read a record; raises :class:`UserError` with everything that is wrong with it."""
        if len(text) > LARGEST_RECORD:
            raise UserError(f"record: larger than {LARGEST_RECORD // 1_000_000} MB; not read")
        try:
            data = json.loads(text, parse_constant=_refuse_constant)
        except (ValueError, RecursionError) as error:
            raise UserError(f"record: not readable as JSON ({str(error)[:80]})") from None
        return cls.from_data(data)

    @classmethod
    def from_data(cls, data: object) -> Record:
        """Check plain data and wrap it; raises :class:`UserError`."""
        if not isinstance(data, dict) or data.get("schema") != SCHEMA:
            raise UserError(f"record: not a lineproof record of schema {SCHEMA}")
        _check(data)
        return cls(data)

    @property
    def calc_id(self) -> str:
        """The id of the calculation, as the notebook opened it."""
        return str(self.data["calc"]["id"])

    @property
    def digest(self) -> str:
        """The digest over all entries."""
        return str(self.data["digest"])

    @property
    def parts(self) -> list[dict[str, Any]]:
        """The parts in order."""
        parts: list[dict[str, Any]] = self.data["parts"]
        return parts

    @cached_property
    def entries(self) -> dict[str, dict[str, Any]]:
        """The entries by id, in order."""
        return {entry["id"]: entry for part in self.parts for entry in part["entries"]}

    @property
    def failed(self) -> list[str]:
        """Ids of the checks that do not hold, accepted exceptions included."""
        return list(self.data["status"]["failed"])

    def to_text(self) -> str:
        """Return the record as JSON text, the same for the same record."""
        return json.dumps(self.data, ensure_ascii=False, allow_nan=False, separators=(",", ":"))

    def __repr__(self) -> str:
        """Show what the record holds."""
        return f"record of {self.calc_id}: {len(self.entries)} lines, digest {self.digest}"

    def _repr_mimebundle_(self, **_: object) -> dict[str, Any]:
        return {MIME: self.data, "text/plain": repr(self)}


def _refuse_constant(name: str) -> float:
    msg = f"{name} is not a number"
    raise ValueError(msg)


def _check(data: dict[str, Any]) -> None:
    faults = FaultList()
    needed: dict[str, type] = {
        "calc": dict, "project": dict, "codes": dict, "notation": list, "parts": list,
        "confirm": list, "status": dict, "digest": str,
    }  # fmt: skip
    for name, kind in needed.items():
        if not isinstance(data.get(name), kind):
            faults.add(f"record: {name!r} is missing or not a {kind.__name__}")
    faults.raise_if_any()
    seen: set[str] = set()
    for entry in _entries(data, faults):
        try:
            _check_entry(entry, seen)
        except UserError as error:
            faults.take(error)
        except (KeyError, TypeError, AttributeError, ValueError) as error:
            name = str(entry.get("id", "?"))[:80]
            faults.add(f"record: entry {name!r} is damaged ({type(error).__name__}: {error})")
    if not isinstance(data["calc"].get("id"), str):
        faults.add("record: the calculation has no id")
    faults.raise_if_any()


def _entries(data: dict[str, Any], faults: FaultList) -> Iterator[dict[str, Any]]:
    for part in data["parts"]:
        if not isinstance(part, dict) or not isinstance(part.get("entries"), list):
            faults.add("record: a part has no list of entries")
            continue
        for entry in part["entries"]:
            if isinstance(entry, dict):
                yield entry
            else:
                faults.add(
                    f"record: part {str(part.get('key'))[:40]!r} holds something else than entries"
                )


def _check_entry(entry: dict[str, Any], seen: set[str]) -> None:
    entry_id, kind = entry["id"], entry["kind"]
    if not _ID.match(entry_id) or kind not in _KINDS:
        raise UserError(
            f"record: {str(entry_id)[:80]!r} of kind {str(kind)[:20]!r} is not an entry"
        )
    if entry_id in seen:
        raise UserError(f"record: {entry_id} stands twice")
    _check_arguments(entry_id, entry.get("args", {}), seen)
    if kind in VALUES and not (_is_number(entry["value"]) and entry["unit"] in UNITS):
        raise UserError(f"record: {entry_id} has no finite value in a known unit")
    seen.add(entry_id)
    if kind == LINE:
        parse_line(entry["formula"])
    if kind in CRITERIA:
        _check_criterion(entry_id, entry)
    if kind == FOUND:
        _check_arguments(entry_id, entry["closing"]["args"], seen)
        _check_criterion(entry_id, entry["closing"])


def _check_criterion(entry_id: str, test: dict[str, Any]) -> None:
    parse_criterion(test["formula"])
    if not (_is_number(test["left"]) and _is_number(test["right"])):
        raise UserError(f"record: {entry_id} compares something that is no finite number")


def _check_arguments(entry_id: str, args: dict[str, str], seen: set[str]) -> None:
    missing = [target for target in args.values() if target not in seen]
    if missing:
        raise UserError(
            f"record: {entry_id} rests on {missing[0]!r}, which does not stand before it"
        )


def _is_number(value: object) -> bool:
    return isinstance(value, int | float) and not isinstance(value, bool) and math.isfinite(value)


__all__ = ["GIVEN", "LOOKUP", "MIME", "Record"]
