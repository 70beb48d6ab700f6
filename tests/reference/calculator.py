"""A formula's function called by the names of its arguments."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.formula import Formula


def value(formula: Formula, given: Mapping[str, float]) -> float:
    """Return what the compiled formula gives, everything in N, mm and MPa."""
    return formula.function(*[float(given[name]) for name in formula.names])
