"""Formulas and criteria of the catalogue on plain numbers: what a choice is made by.

The numbers are in N, mm, MPa; a recorded line gives the same value, since it is the same formula.
"""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.formula import Criterion, Formula
from lineproof.record.printing import ratio

Numbers = dict[str, float]
"""Values by symbol, internal units."""


def value(formula: Formula, at: Mapping[str, float]) -> float:
    """Return what a formula gives."""
    return formula.at(at)


def put(at: Numbers, *formulas: Formula) -> float:
    """Put what formulas give into the numbers, one after the other; return the last."""
    last = 0.0
    for formula in formulas:
        last = at[formula.symbol] = value(formula, at)
    return last


def utilisation(test: Criterion, at: Mapping[str, float]) -> float:
    """Return demand over resistance of a check: at most 1 where it holds, more where it fails."""
    left, right = test.sides(at)
    holds = test.holds(left, right)
    made = ratio(test.sign, left, right)
    if made is None or (made <= 1) != holds:
        return 0.0 if holds else float("inf")
    return made


def holds(test: Criterion, at: Mapping[str, float]) -> bool:
    """Tell whether a criterion holds."""
    return test.holds(*test.sides(at))
