"""The tables that gather a record: checks, failures, loads, notation, values to confirm."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from itertools import groupby
from typing import Any

from lineproof.formula.grammar import parse_criterion
from lineproof.formula.notation import Notation, Symbol
from lineproof.formula.tree import Name, Tree
from lineproof.typeset.nodes import EQUALS, Math, row
from lineproof.typeset.rows import PrintedRow, notation_of
from lineproof.typeset.values import symbol_math, unit_text, value_math
from lineproof.typeset.visitor import formula_math

Rows = Mapping[str, PrintedRow]
_LONGEST_SYMBOL = 24


@dataclass(frozen=True, slots=True)
class SummaryRow:
    """A check on the summary page; ``part`` is the key of its part, ``group`` the title."""

    anchor: str
    label: str
    title: str
    clause: str
    demand: Math
    resistance: Math
    ratio: str
    verdict: str
    holds: bool
    group: str
    part: str
    utilisation: float | None = None
    leads: bool = False


@dataclass(frozen=True, slots=True)
class PartSummary:
    """The checks of one part in one row: how many, how many fail, the one nearest its limit.

    Where no check has a utilisation, the first one stands for them.
    """

    group: str
    count: int
    failed: int
    governing: SummaryRow


@dataclass(frozen=True, slots=True)
class Failure:
    """A check that does not hold, for the cover; ``place`` is the title of its part.

    A check that ``leads`` stands before the others and says in its title where it is.
    """

    anchor: str
    label: str
    title: str
    id: str
    accepted: bool
    place: str = ""
    leads: bool = False


@dataclass(frozen=True, slots=True)
class LoadRow:
    """A line of the load take-down."""

    anchor: str
    label: str
    title: str
    result: Math
    clause: str


@dataclass(frozen=True, slots=True)
class NotationRow:
    """A symbol of the notation page."""

    symbol: Math
    meaning: str
    unit: str


@dataclass(frozen=True, slots=True)
class Confirmation:
    """A value or rule that the office confirms in its own copy; empty ``confirmed``: not yet."""

    clause: str
    what: str
    basis: str
    confirmed: str
    lines: tuple[tuple[str, str], ...]


def summary_rows(
    parts: Sequence[Mapping[str, Any]], rows: Rows, notation: Notation, prefix: str
) -> tuple[SummaryRow, ...]:
    """Return every check: demand, resistance or limit, ratio, verdict; ``group`` is its part.

    A proof of the calculation itself (two paths agree) that holds is not a check of the beam.
    """
    entries = [(part, entry) for part in parts for entry in part["entries"]]
    made = []
    for part, entry in entries:
        if entry["kind"] != "check" or is_proof_that_holds(entry):
            continue
        printed = rows[entry["id"]]
        demand, resistance = _sides(entry, notation)
        made.append(
            SummaryRow(
                anchor=prefix + entry["id"],
                label=printed.label,
                title=printed.title,
                clause=printed.clause,
                demand=demand,
                resistance=resistance,
                ratio=printed.ratio,
                verdict=printed.verdict,
                holds=printed.holds,
                group=part["title"],
                part=part["key"],
                utilisation=entry.get("utilisation"),
                leads=bool(entry.get("leads")),
            )
        )
    return tuple(made)


def is_proof_that_holds(entry: Mapping[str, Any]) -> bool:
    """Tell whether an entry is a proof of the calculation itself, and no check of the beam."""
    return bool(entry["kind"] == "check" and entry.get("proof") and entry["holds"])


def part_summaries(rows: Sequence[SummaryRow]) -> tuple[PartSummary, ...]:
    """Return one row for the checks of each part, in the order of the parts."""
    made = []
    for _, found in groupby(rows, key=lambda row: row.part):  # titles may be the same
        checks = list(found)
        failed = [row for row in checks if not row.holds]
        governing = max(failed or checks, key=_nearness)
        made.append(PartSummary(checks[0].group, len(checks), len(failed), governing))
    return tuple(made)


def _nearness(check: SummaryRow) -> float:
    return -1.0 if check.utilisation is None else check.utilisation


def _sides(entry: Mapping[str, Any], notation: Notation) -> tuple[Math, Math]:
    """Return demand and resistance; where the criterion asks for "at least", they swap sides."""
    left, sign, right = parse_criterion(entry["formula"])
    printed = entry["printed"]
    sides = [
        _named(tree, value_math(printed[side], printed.get("unit", "")), notation)
        for tree, side in ((left, "left"), (right, "right"))
    ]
    return (sides[1], sides[0]) if sign in (">=", ">") else (sides[0], sides[1])


def _named(tree: Tree, value: Math, notation: Notation) -> Math:
    if not isinstance(tree, Name) or len(tree.id) > _LONGEST_SYMBOL:
        return value
    return row([formula_math(tree, notation), EQUALS, value])


def failures(record: Mapping[str, Any], rows: Rows, prefix: str) -> tuple[Failure, ...]:
    """Return the checks that do not hold, accepted exceptions included; first those that lead."""
    listed = dict.fromkeys(record["status"].get("failed", []))
    seen = {row_id: None for row_id, printed in rows.items() if not printed.holds}
    entries = {e["id"]: (e, part["title"]) for part in record["parts"] for e in part["entries"]}
    found = []
    for row_id in (row_id for row_id in listed | seen if row_id in rows):
        entry, place = entries[row_id]
        leads = bool(entry.get("leads"))
        found.append(
            Failure(
                prefix + row_id,
                rows[row_id].label,
                rows[row_id].title,
                row_id,
                accepted=rows[row_id].verdict.startswith("accepted"),
                place="" if leads else place,
                leads=leads,
            )
        )
    return tuple(sorted(found, key=lambda failure: not failure.leads))


def load_rows(parts: Sequence[Mapping[str, Any]], rows: Rows, prefix: str) -> tuple[LoadRow, ...]:
    """Return the take-down: every value of the parts whose key begins with "loads"."""
    made = []
    for part in parts:
        if not part["key"].startswith("loads"):
            continue
        for entry in part["entries"]:
            printed = rows[entry["id"]]
            if printed.result is not None:
                made.append(
                    LoadRow(
                        prefix + printed.id,
                        printed.label,
                        printed.title,
                        printed.result,
                        printed.clause,
                    )
                )
    return tuple(made)


def notation_rows(records: Sequence[Mapping[str, Any]]) -> tuple[NotationRow, ...]:
    """Return every symbol of all records once, in order of its letters."""
    found: dict[tuple[str, str, str], Symbol] = {}
    for record in records:
        for symbol in notation_of(record).values():
            found.setdefault((symbol.id, symbol.meaning, symbol.unit), symbol)
    ordered = sorted(found.values(), key=lambda s: (s.id.lower(), s.id, s.meaning))
    return tuple(NotationRow(symbol_math(s), s.meaning, unit_text(s.unit)) for s in ordered)


def confirmations(record: Mapping[str, Any], rows: Rows, prefix: str) -> tuple[Confirmation, ...]:
    """Return the values to confirm, each with the labels and anchors of the lines it bears."""
    return tuple(
        Confirmation(
            clause=item.get("clause", ""),
            what=item.get("what") or "; ".join(_titles(item.get("lines", []), rows)),
            basis=item.get("basis", ""),
            confirmed=item.get("confirmed", ""),
            lines=tuple(
                (prefix + line, rows[line].label or line)
                for line in item.get("lines", [])
                if line in rows
            ),
        )
        for item in record.get("confirm", [])
    )


def _titles(lines: Iterable[str], rows: Rows) -> list[str]:
    return list(dict.fromkeys(rows[line].title for line in lines if line in rows))
