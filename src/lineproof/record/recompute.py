"""Recomputing a record from its givens: every stored value against its own formula."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from typing import Any

from lineproof.errors import UserError
from lineproof.formula import names_of, parse_criterion, parse_line
from lineproof.formula.compiled import COMPARE, weave_tree
from lineproof.formula.tree import Tree
from lineproof.quantity import read_quantity
from lineproof.quantity.units import internal_factor
from lineproof.record import printed_checks
from lineproof.record.entry import CHECK, CRITERIA, FOUND, GIVEN, LINE, LOOKUP, VALUES
from lineproof.record.printing import ratio
from lineproof.record.procedures import recall, run
from lineproof.record.record import Record
from lineproof.record.uncollected import uncollected

SAME = 1e-9
"""Relative difference up to which two computed floats count as the same."""
REMAINDER = 1e-11
"""Part of the larger side of a comparison up to which the smaller is the rounding of a sum."""


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


def close(first: float, second: float, rounding: float = 0.0) -> bool:
    """Tell whether two floats are the same but for the last bits, or differ by no more rounding."""
    return abs(first - second) <= max(SAME * max(abs(first), abs(second), 1e-12), rounding)


def recompute(record: Record) -> list[Difference]:
    """Return every difference between what the record holds, prints and hashes and its formulas.

    Values are recomputed from the givens on, so one wrong line shows with all that follow it.
    """
    with uncollected():
        return _all_differences(record)


def _all_differences(record: Record) -> list[Difference]:
    values: dict[str, float] = {}
    units = {i: entry["unit"] for i, entry in record.entries.items() if "unit" in entry}
    differences: list[Difference] = []
    # Values found together close one another: closings are compared when all values are known.
    closings = [e for e in record.entries.values() if e["kind"] == FOUND]
    steps = [(e, _differences) for e in record.entries.values()] + [(e, _closing) for e in closings]
    for entry, compare in steps:
        try:
            differences.extend(compare(entry, values, units))
        except (ArithmeticError, ValueError, TypeError, KeyError) as error:
            stored = str(entry.get("value", entry.get("holds", "")))
            differences.append(Difference(entry["id"], "value", stored, f"failed: {error}"))
            if entry["kind"] in VALUES:
                values.setdefault(entry["id"], _stored(entry["value"], entry["unit"]))
    again = printed_checks.digests(record.entries)
    differences += [
        Difference(i, "digest", entry["digest"], again[i])
        for i, entry in record.entries.items()
        if entry["digest"] != again[i]
    ]
    differences += [
        Difference("record", *found) for found in printed_checks.whole(record.data, record.entries)
    ]
    return differences


def _differences(
    entry: Mapping[str, Any], values: dict[str, float], units: Mapping[str, str]
) -> Iterator[Difference]:
    kind, entry_id = entry["kind"], entry["id"]
    if kind in CRITERIA:
        yield from _criterion(entry_id, entry, values, units)
    elif kind in VALUES:
        value = _value(entry, values)
        values[entry_id] = value
        if not close(value, _stored(entry["value"], entry["unit"])):
            again = value / internal_factor(entry["unit"])
            yield Difference(entry_id, "value", f"{entry['value']:.10g}", f"{again:.10g}")
        for found in _printed(entry, value, values, units):
            yield Difference(entry_id, *found)


def _closing(
    entry: Mapping[str, Any], values: dict[str, float], units: Mapping[str, str]
) -> Iterator[Difference]:
    yield from _criterion(entry["id"], entry["closing"], values, units)


def _printed(
    entry: Mapping[str, Any], value: float, values: Mapping[str, float], units: Mapping[str, str]
) -> Iterator[printed_checks.Finding]:
    yield from printed_checks.printed_value(entry["printed"], value)
    if entry["kind"] == GIVEN:
        yield from printed_checks.printed_typed(entry)
    if entry["kind"] in (LINE, FOUND):
        yield from printed_checks.printed_arguments(entry, values, units)


def _stored(value: float, unit: str) -> float:
    """Return a stored value in the internal unit."""
    return value * internal_factor(unit)


def _value(entry: Mapping[str, Any], values: Mapping[str, float]) -> float:
    kind = entry["kind"]
    if kind == GIVEN:
        return read_quantity(entry["symbol"], entry["typed"], entry["unit"]).value
    if kind == LOOKUP:
        # Read as the sheet read it: the last bit of 7.2 kPa would else grow where values balance.
        printed = entry["printed"]
        text = f"{printed['result']} {printed['unit']}"
        return read_quantity(entry["symbol"], text, printed["unit"]).value
    if kind == LINE:
        _, tree = parse_line(entry["formula"])
        return _evaluate(tree, entry["args"], values)
    made = recall(entry["procedure"]["name"], entry["procedure"]["version"])
    if made is None:
        raise UserError(f"procedure {entry['procedure']['name']!r} is not known here")
    named = {name: values[target] for name, target in entry["args"].items()}
    if not made.takes(named):
        raise UserError(f"procedure {made.name!r} takes {', '.join(made.names)}")
    value = run(made, named, entry["settings"])
    if not math.isfinite(value):
        raise UserError(f"procedure {made.name!r} finds no finite number")
    return value


def _evaluate(tree: Tree, args: Mapping[str, str], values: Mapping[str, float]) -> float:
    names = names_of(tree)
    result = weave_tree(tree, names)(*[values[args[name]] for name in names])
    if not isinstance(result, float) or not math.isfinite(result):
        raise UserError("the result is not a real number")
    return result


def _criterion(
    entry_id: str, test: Mapping[str, Any], values: Mapping[str, float], units: Mapping[str, str]
) -> Iterator[Difference]:
    left_tree, sign, right_tree = parse_criterion(test["formula"])
    left = _evaluate(left_tree, test["args"], values)
    right = _evaluate(right_tree, test["args"], values)
    scale = internal_factor(test["unit"])
    # What is left of a sum in equilibrium is rounding: it counts against what it is compared with.
    rounding = REMAINDER * max(abs(left), abs(right))
    for what, stored, value in (("left", test["left"], left), ("right", test["right"], right)):
        if not close(_stored(stored, test["unit"]), value, rounding):
            yield Difference(entry_id, f"{what} side", f"{stored:.10g}", f"{value / scale:.10g}")
    if _truth(sign, left, right) not in (None, test["holds"]):
        yield Difference(entry_id, "truth", str(test["holds"]), str(not test["holds"]))
    for found in printed_checks.printed_comparison(test, (left, right)):
        yield Difference(entry_id, *found)
    for found in printed_checks.printed_arguments(test, values, units):
        yield Difference(entry_id, *found)
    if test.get("kind") == CHECK:
        for found in printed_checks.printed_utilisation(test, ratio(sign, left, right)):
            yield Difference(entry_id, *found)


def _truth(sign: str, left: float, right: float) -> bool | None:
    """Return the truth of a comparison, or None where the last bits decide it."""
    if left != right and close(left, right):
        return None
    return COMPARE[sign](left, right)
