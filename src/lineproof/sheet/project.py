"""The project's facts: one TOML file beside its calculations."""

from __future__ import annotations

import datetime as dt
import difflib
import tomllib
from collections.abc import Sequence
from pathlib import Path
from typing import Any

from lineproof.errors import UserError
from lineproof.record.plain_data import LARGEST_INTEGER
from lineproof.resources import read_file

KNOWN: dict[str, tuple[str, ...]] = {
    "project": ("name", "number", "address", "client"),
    "firm": ("name", "permit"),
    "codes": ("pair", "amendments"),
    "building": ("importance",),
    "location": ("grid", "level"),
    "locations": ("calc", "grid", "level"),
    "issue": ("status", "date", "revision", "superseded", "prepared_by", "checked_by"),
    "paper": ("size",),
    "drawings": ("number", "revision", "title"),
    "revisions": ("letter", "date", "description"),
    "confirmed": ("clause", "edition", "value", "by", "on"),
}
"""The facts of a project by table; ``criteria`` holds whatever the office wants to state.

``location`` is that of the whole project, a row of ``locations`` that of one calculation.
"""
IMPORTANCE = ("low", "normal", "high", "post-disaster")
"""The importance categories of NBC 4.1.2.1."""
LARGEST_FILE = 1_000_000
DEEPEST = 3


def read_project(path: Path) -> dict[str, Any]:
    """Read the project file into plain JSON data (dates become ISO text).

    Raises :class:`UserError` that names file, line and what to write.
    """
    absent = "no such file; copy the project.toml of the project beside the calc, or write its name"
    content = read_file(path, LARGEST_FILE, "a project file holds facts only", absent)
    try:
        data = tomllib.loads(content.decode("utf-8-sig"))  # some editors put a mark in front
    except UnicodeDecodeError:
        raise UserError(f"{path}: cannot be read (not UTF-8 text)") from None
    except (ValueError, RecursionError) as error:
        raise UserError(f"{path}: not valid TOML: {error}") from None
    _check_values(path, data)
    facts: dict[str, Any] = _plain(data)
    _check_facts(path, facts)
    return facts


def _check_values(path: Path, data: dict[str, Any]) -> None:
    """Refuse what a record cannot hold, by the name it has in the file."""
    faults = []
    waiting: list[tuple[str, object, int]] = [("", data, 0)]
    while waiting:
        name, value, depth = waiting.pop()
        inside = (
            value.items() if isinstance(value, dict)
            else enumerate(value, 1) if isinstance(value, list)
            else ()
        )  # fmt: skip
        if inside and depth == DEEPEST:
            faults.append(f"{path}: {name[:60]} is nested too deeply; write plain texts")
        elif inside:
            waiting += [(f"{name}.{key}".lstrip("."), item, depth + 1) for key, item in inside]
        elif isinstance(value, int | float) and not abs(value) <= LARGEST_INTEGER:
            faults.append(f"{path}: {name[:60]} is no number that can be kept; write it as a text")
    if faults:
        raise UserError(sorted(faults))


def _plain(value: object) -> Any:
    if isinstance(value, dict):
        return {str(k): _plain(v) for k, v in value.items()}
    if isinstance(value, list):
        return [_plain(v) for v in value]
    if isinstance(value, dt.date | dt.time | dt.datetime):
        return value.isoformat()
    return value


def _check_facts(path: Path, facts: dict[str, Any]) -> None:
    tables = ("project", "firm", "codes", "building", "location", "issue", "paper", "criteria")
    faults = [
        f"{path}: {table!r} must be a table; write [{table}]"
        for table in tables
        if not isinstance(facts.get(table, {}), dict)
    ]
    for rows in ("drawings", "revisions", "locations", "confirmed"):
        given = facts.get(rows, [])
        if not (isinstance(given, list) and all(isinstance(row, dict) for row in given)):
            faults.append(f"{path}: {rows!r} must be a list of tables; write [[{rows}]]")
    faults += [*_unknown(path, facts), *_unsigned(path, facts), *_unknown_importance(path, facts)]
    if not isinstance(facts.get("codes"), dict) or "pair" not in facts["codes"]:
        faults.append(f"{path}: no code pair; write under [codes]: pair = 'NBC 2015 + A23.3-14'")
    elif not isinstance(facts["codes"]["pair"], str):
        faults.append(f"{path}: codes.pair is no text; write pair = 'NBC 2015 + A23.3-14'")
    if faults:
        raise UserError(faults)


def _unsigned(path: Path, facts: dict[str, Any]) -> list[str]:
    """Return a fault per confirmation that does not say which clause of what, who and when."""
    rows = facts.get("confirmed", [])
    return [
        f"{path}: confirmed: row {number} has no {key!r}; write clause, edition, by and on, such "
        "as clause = '10.1.7', edition = 'CSA A23.3-14', by = 'A.B.', on = 2026-11-20"
        for number, row in enumerate(rows if isinstance(rows, list) else [], 1)
        if isinstance(row, dict)
        for key in ("clause", "edition", "by", "on")
        if not str(row.get(key, "")).strip()
    ]


def _unknown_importance(path: Path, facts: dict[str, Any]) -> list[str]:
    """Return a fault for an importance category that the code has not."""
    table = facts.get("building", {})
    given = table.get("importance", "") if isinstance(table, dict) else ""
    if given == "" or str(given).lower() in IMPORTANCE:
        return []
    words = f"{', '.join(map(repr, IMPORTANCE[:-1]))} or {IMPORTANCE[-1]!r}"
    given = str(given)[:40]
    return [f"{path}: building.importance: {given!r} is no importance category; write {words}"]


def _unknown(path: Path, facts: dict[str, Any]) -> list[str]:
    """Return a fault per fact that nothing reads: a misspelt one would print as an empty line."""
    faults = [
        f"{path}: {table!r} is not a table of facts{_near(table, [*KNOWN, 'criteria'])}"
        for table in facts
        if table not in KNOWN and table != "criteria"
    ]
    for table, known in KNOWN.items():
        given = facts.get(table, {})
        for row in given if isinstance(given, list) else [given]:
            keys = row if isinstance(row, dict) else {}
            faults += [
                f"{path}: {table}.{key[:40]} is not a fact{_near(key, known)}"
                for key in keys
                if key not in known
            ]
    return faults


def _near(word: str, known: Sequence[str]) -> str:
    close = difflib.get_close_matches(word[:40], known, n=1)
    listed = ", ".join(known)
    return f"; did you mean {close[0]!r}?" if close else f"; there are {listed}"
