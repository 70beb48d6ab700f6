"""Recomputing a record from its givens: every stored value against its own formula."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import Any

from lineproof.errors import UserError
from lineproof.formula import names_of, parse_criterion, parse_line
from lineproof.formula.compiled import COMPARE, compile_tree
from lineproof.formula.tree import Tree
from lineproof.quantity import read_quantity
from lineproof.quantity.units import internal_factor
from lineproof.record.entry import CRITERIA, FOUND, GIVEN, LINE, LOOKUP, VALUES
from lineproof.record.procedures import recall, run
from lineproof.record.record import Record

SAME = 1e-9
"""Relative difference up to which two computed floats count as the same."""


@dataclass(frozen=True, slots=True)
class Difference:
    """A stored value that does not follow from the record's own formulas and givens."""

    id: str
    what: str
    stored: str
    recomputed: str

    def __str__(self) -> str:
        """Say which line differs and how."""
        return f"{self.id}: {self.what} stored {self.stored}, recomputed {self.recomputed}"


def close(first: float, second: float) -> bool:
    """Tell whether two floats are the same but for the last bits."""
    return abs(first - second) <= SAME * max(abs(first), abs(second), 1e-12)


def recompute(record: Record) -> list[Difference]:
    """Return every difference between the stored values and the recomputed ones.

    Values are recomputed from the givens on, so one wrong line shows with all that follow it.
    """
    values: dict[str, float] = {}
    differences: list[Difference] = []
    for entry in record.entries.values():
        try:
            differences.extend(_differences(entry, values))
        except (ArithmeticError, ValueError, TypeError, KeyError) as error:
            stored = str(entry.get("value", entry.get("holds", "")))
            differences.append(Difference(entry["id"], "value", stored, f"failed: {error}"))
            if entry["kind"] in VALUES:
                values[entry["id"]] = _stored(entry["value"], entry["unit"])
    return differences


def _differences(entry: Mapping[str, Any], values: dict[str, float]) -> Iterator[Difference]:
    kind, entry_id = entry["kind"], entry["id"]
    if kind in CRITERIA:
        yield from _criterion(entry_id, entry, values)
    elif kind in VALUES:
        value = _value(entry, values)
        values[entry_id] = value
        if not close(value, _stored(entry["value"], entry["unit"])):
            again = value / internal_factor(entry["unit"])
            yield Difference(entry_id, "value", f"{entry['value']:.10g}", f"{again:.10g}")
        if kind == FOUND:
            yield from _criterion(entry_id, entry["closing"], values)


def _stored(value: float, unit: str) -> float:
    """Return a stored value in the internal unit."""
    return value * internal_factor(unit)


def _value(entry: Mapping[str, Any], values: Mapping[str, float]) -> float:
    kind = entry["kind"]
    if kind == GIVEN:
        return read_quantity(entry["symbol"], entry["typed"], entry["unit"]).value
    if kind == LOOKUP:
        return float(entry["printed"]["result"]) * internal_factor(entry["printed"]["unit"])
    if kind == LINE:
        symbol, tree = parse_line(entry["formula"])
        if symbol != entry["symbol"]:
            raise UserError(f"the formula gives {symbol}, not {entry['symbol']}")
        return _evaluate(tree, entry["args"], values)
    made = recall(entry["procedure"]["name"], entry["procedure"]["version"])
    if made is None:
        raise UserError(f"procedure {entry['procedure']['name']!r} is not known here")
    named = {name: values[target] for name, target in entry["args"].items()}
    return run(made, named, entry["settings"])


def _evaluate(tree: Tree, args: Mapping[str, str], values: Mapping[str, float]) -> float:
    names = names_of(tree)
    result = compile_tree(tree, names)(*[values[args[name]] for name in names])
    if not isinstance(result, float):
        raise UserError("the result is not a real number")
    return result


def _criterion(
    entry_id: str, test: Mapping[str, Any], values: Mapping[str, float]
) -> Iterator[Difference]:
    left_tree, sign, right_tree = parse_criterion(test["formula"])
    left = _evaluate(left_tree, test["args"], values)
    right = _evaluate(right_tree, test["args"], values)
    scale = internal_factor(test["unit"])
    for what, stored, value in (("left", test["left"], left), ("right", test["right"], right)):
        if not close(_stored(stored, test["unit"]), value):
            yield Difference(entry_id, f"{what} side", f"{stored:.10g}", f"{value / scale:.10g}")
    holds = COMPARE[sign](left, right)
    if holds != test["holds"]:
        yield Difference(entry_id, "truth", str(test["holds"]), str(holds))
