"""The value of a tree in its sympy form, at as many digits as asked for."""

from __future__ import annotations

from collections.abc import Mapping

import sympy

from lineproof.formula import Tree
from lineproof.formula.algebra import expression, symbol


def value_at(tree: Tree, values: Mapping[str, float], digits: int = 50) -> float:
    """Evaluate with ``digits`` digits; raises :class:`ValueError` where there is no real value."""
    at = {symbol(name): sympy.Rational(value) for name, value in values.items()}
    value = expression(tree).subs(at).evalf(digits)
    if not value.is_Float and not value.is_Rational:
        raise ValueError(f"no real value, but {str(value)[:60]}")
    return float(value)
