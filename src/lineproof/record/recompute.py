"""Recomputing a record from its givens: every stored value against its own formula."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

from lineproof.errors import UserError
from lineproof.formula import parse_criterion, parse_line
from lineproof.formula.compiled import COMPARE, MOST_KEPT, Woven, weave_tree
from lineproof.quantity import read_quantity
from lineproof.quantity.units import internal_factor
from lineproof.record import printed_checks
from lineproof.record.entry import CHECK, DECISION, FOUND, GIVEN, LINE, LOOKUP, VALUES
from lineproof.record.printed_checks import Finding
from lineproof.record.printing import ratio
from lineproof.record.procedures import recall, run
from lineproof.record.record import Record
from lineproof.record.uncollected import uncollected

SAME = 1e-9
"""Relative difference up to which two computed floats count as the same."""
REMAINDER = 1e-11
"""Part of the larger side of a comparison up to which the smaller is the rounding of a sum."""
Data = Mapping[str, Any]


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
    if first == second:
        return True
    return abs(first - second) <= max(SAME * max(abs(first), abs(second), 1e-12), rounding)


def recompute(record: Record) -> list[Difference]:
    """Return every difference between what the record holds, prints and hashes and its formulas.

    Values are recomputed from the givens on, so one wrong line shows with all that follow it.
    """
    with uncollected():
        return _all_differences(record)


def _all_differences(record: Record) -> list[Difference]:
    entries, so_far = record.entries, _SoFar()
    for entry in entries.values():
        compare = _OF_KIND.get(entry["kind"])
        if compare is not None:
            so_far.take(entry, compare)
    # Values found together close one another: closings are compared when all values are known.
    for found in so_far.closings:
        so_far.take(found, _closing)
    hashed = [Difference(i, *one) for i, one in printed_checks.hashed(entries)]
    whole = [Difference("record", *one) for one in printed_checks.whole(record.data, entries)]
    return [*so_far.differences, *hashed, *whole]


class _SoFar:
    """The values recomputed so far [internal unit] by id, what is left to close, what differs."""

    def __init__(self) -> None:
        self.values: dict[str, float] = {}
        self.units: dict[str, str] = {}
        self.closings: list[Data] = []
        self.differences: list[Difference] = []

    def take(self, entry: Data, compare: Comparing) -> None:
        """Compare an entry; one that cannot be worked out stands for what follows as stored."""
        try:
            found = compare(entry, self)
        except (ArithmeticError, ValueError, TypeError, KeyError) as error:
            stored = str(entry.get("value", entry.get("holds", "")))
            found = [("value", stored, f"failed: {error}")]
            if entry["kind"] in VALUES and entry["id"] not in self.values:
                self._keep(entry, entry["value"] * internal_factor(entry["unit"]))
        if found:
            self.differences += [Difference(entry["id"], *one) for one in found]

    def named(self, args: Mapping[str, str]) -> dict[str, float]:
        """Return the values that an entry rests on, by their names in its formula."""
        values = self.values
        return {name: values[target] for name, target in args.items()}

    def compared(self, entry: Data, value: float) -> list[Finding]:
        """Keep a recomputed value; compare the stored and the printed one with it."""
        self._keep(entry, value)
        found = printed_checks.printed_value(entry["printed"], value)
        stored, scale = entry["value"], internal_factor(entry["unit"])
        if not close(value, stored * scale):
            found.insert(0, ("value", f"{stored:.10g}", f"{value / scale:.10g}"))
        return found

    def _keep(self, entry: Data, value: float) -> None:
        self.values[entry["id"]] = value
        self.units[entry["id"]] = entry["unit"]


Comparing = Callable[[Data, _SoFar], list[Finding]]


def _given(entry: Data, so_far: _SoFar) -> list[Finding]:
    typed = read_quantity(entry["symbol"], entry["typed"], entry["unit"])
    return so_far.compared(entry, typed.value) + printed_checks.printed_typed(entry, typed)


def _lookup(entry: Data, so_far: _SoFar) -> list[Finding]:
    # Read as the sheet read it: the last bit of 7.2 kPa would else grow where values balance.
    printed = entry["printed"]
    text = f"{printed['result']} {printed['unit']}"
    return so_far.compared(entry, read_quantity(entry["symbol"], text, printed["unit"]).value)


def _line(entry: Data, so_far: _SoFar) -> list[Finding]:
    named = so_far.named(entry["args"])
    found = so_far.compared(entry, _evaluate(_woven(entry["formula"]), named))
    return found + printed_checks.printed_arguments(entry, named, so_far.units)


def _found(entry: Data, so_far: _SoFar) -> list[Finding]:
    so_far.closings.append(entry)
    made = recall(entry["procedure"]["name"], entry["procedure"]["version"])
    if made is None:
        raise UserError(f"procedure {entry['procedure']['name']!r} is not known here")
    named = so_far.named(entry["args"])
    value = run(made, named, entry["settings"])
    if not math.isfinite(value):
        raise UserError(f"procedure {made.name!r} finds no finite number")
    found = so_far.compared(entry, value)
    return found + printed_checks.printed_arguments(entry, named, so_far.units)


def _closing(entry: Data, so_far: _SoFar) -> list[Finding]:
    return _criterion(entry["closing"], so_far)


def _criterion(test: Data, so_far: _SoFar) -> list[Finding]:
    left_side, sign, right_side = _woven_sides(test["formula"])
    named = so_far.named(test["args"])
    left, right = _evaluate(left_side, named), _evaluate(right_side, named)
    scale = internal_factor(test["unit"])
    # What is left of a sum in equilibrium is rounding: it counts against what it is compared with.
    rounding = REMAINDER * max(abs(left), abs(right))
    found = [
        (f"{what} side", f"{test[what]:.10g}", f"{value / scale:.10g}")
        for what, value in (("left", left), ("right", right))
        if not close(test[what] * scale, value, rounding)
    ]
    if _truth(sign, left, right) not in (None, test["holds"]):
        found.append(("truth", str(test["holds"]), str(not test["holds"])))
    found += printed_checks.printed_comparison(test, (left, right))
    found += printed_checks.printed_arguments(test, named, so_far.units)
    if test.get("kind") == CHECK:
        found += printed_checks.printed_utilisation(test, ratio(sign, left, right))
    return found


_OF_KIND: Mapping[str, Comparing] = {
    GIVEN: _given, LOOKUP: _lookup, LINE: _line, FOUND: _found,
    DECISION: _criterion, CHECK: _criterion,
}  # fmt: skip


@lru_cache(maxsize=MOST_KEPT)
def _woven(formula: str) -> Woven:
    return weave_tree(parse_line(formula)[1])


@lru_cache(maxsize=MOST_KEPT)
def _woven_sides(comparison: str) -> tuple[Woven, str, Woven]:
    left, sign, right = parse_criterion(comparison)
    return weave_tree(left), sign, weave_tree(right)


def _evaluate(function: Woven, named: Mapping[str, float]) -> float:
    result = function(named)
    if not isinstance(result, float) or not math.isfinite(result):
        raise UserError("the result is not a real number")
    return result


def _truth(sign: str, left: float, right: float) -> bool | None:
    """Return the truth of a comparison, or None where the last bits decide it."""
    if left != right and close(left, right):
        return None
    return COMPARE[sign](left, right)
