"""The catalogue's formulas on arrays: the same compiled expression, numpy's functions in it.

A beam has thousands of pairs of moment and shear, by load case and station. They are worked out
at once, and the formula still stands once, in the catalogue.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from functools import cache, reduce
from types import FunctionType
from typing import Any, cast

import numpy as np
from numpy.typing import NDArray

from lineproof.beams.analysis.curves import Floats
from lineproof.formula import Criterion, Formula
from lineproof.formula.compiled import ROUND_OFF, called

Truths = NDArray[np.bool_]
Values = Mapping[str, Any]
"""Numbers or arrays by symbol, in N, mm and MPa."""


def _cot(angle: Floats) -> Floats:
    made: Floats = 1.0 / np.tan(np.radians(angle))
    return made


_SCOPE: dict[str, Any] = {
    called("sqrt"): np.sqrt,
    called("abs"): np.abs,
    called("min"): lambda *args: reduce(np.minimum, args),
    called("max"): lambda *args: reduce(np.maximum, args),
    called("cot"): _cot,
    "__builtins__": {},
}


def _on_arrays(function: Callable[..., float]) -> Callable[..., Any]:
    return FunctionType(cast("FunctionType", function).__code__, _SCOPE)


@cache
def _formula_on_arrays(formula: Formula) -> Callable[..., Any]:
    return _on_arrays(formula.function)


@cache
def _sides_on_arrays(test: Criterion) -> tuple[Callable[..., Any], Callable[..., Any]]:
    left, right = test.functions
    return _on_arrays(left), _on_arrays(right)


def value(formula: Formula, values: Values) -> Any:
    """Return what a formula gives for numbers or arrays of them."""
    return _formula_on_arrays(formula)(*[values[name] for name in formula.names])


def sides(test: Criterion, values: Values) -> tuple[Any, Any]:
    """Return both sides of a comparison for numbers or arrays of them."""
    args = [values[name] for name in test.names]
    left, right = _sides_on_arrays(test)
    return left(*args), right(*args)


def holds(test: Criterion, values: Values) -> Any:
    """Tell where a comparison is true; a limit met but for round-off is met, as on a sheet."""
    left, right = sides(test, values)
    room = ROUND_OFF * np.maximum(np.abs(left), np.abs(right))
    match test.sign:
        case "<=":
            return left <= right + room
        case "<":
            return left < right - room
        case ">=":
            return left >= right - room
        case _:
            return left > right + room
