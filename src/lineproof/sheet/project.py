"""The project's facts: one TOML file beside its calculations."""

from __future__ import annotations

import datetime as dt
import tomllib
from pathlib import Path
from typing import Any

from lineproof.errors import UserError

LARGEST_FILE = 1_000_000


def read_project(path: Path) -> dict[str, Any]:
    """Read the project file into plain JSON data (dates become ISO text).

    Raises :class:`UserError` that names file, line and what to write.
    """
    try:
        if path.stat().st_size > LARGEST_FILE:
            raise UserError(f"{path}: larger than 1 MB; a project file holds facts only")
        data = tomllib.loads(path.read_text(encoding="utf-8"))
    except (OSError, UnicodeDecodeError) as error:
        reason = getattr(error, "strerror", None) or "not UTF-8 text"
        raise UserError(f"{path}: the project file cannot be read ({reason})") from None
    except tomllib.TOMLDecodeError as error:
        raise UserError(f"{path}: not valid TOML: {error}") from None
    facts: dict[str, Any] = _plain(data)
    _check_facts(path, facts)
    return facts


def _plain(value: object) -> Any:
    if isinstance(value, dict):
        return {str(k): _plain(v) for k, v in value.items()}
    if isinstance(value, list):
        return [_plain(v) for v in value]
    if isinstance(value, dt.date | dt.time | dt.datetime):
        return value.isoformat()
    return value


def _check_facts(path: Path, facts: dict[str, Any]) -> None:
    tables = ("project", "firm", "codes", "building", "location", "issue", "paper")
    faults = [
        f"{path}: {table!r} must be a table; write [{table}]"
        for table in tables
        if not isinstance(facts.get(table, {}), dict)
    ]
    for rows in ("drawings", "revisions", "confirmed"):
        given = facts.get(rows, [])
        if not (isinstance(given, list) and all(isinstance(row, dict) for row in given)):
            faults.append(f"{path}: {rows!r} must be a list of tables; write [[{rows}]]")
    if not isinstance(facts.get("codes"), dict) or "pair" not in facts["codes"]:
        faults.append(f"{path}: no code pair; write under [codes]: pair = 'NBC 2015 + A23.3-14'")
    if faults:
        raise UserError(faults)
