"""Trees at sample points: whether two formulas give the same, and by what factor they differ.

Numbers decide first, since algebra may take any time; the points are the same in every run.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable, Iterator, Mapping
from functools import reduce
from itertools import count
from typing import Any

import numpy as np
from numpy.typing import NDArray

from lineproof.formula import Binary, Call, Name, Negative, Number, Tree
from lineproof.quantity.units import UNITS
from lineproof.standards.catalogue import NOTATION

Values = NDArray[np.float64]
POINTS = 24
"""Points at which formulas are compared."""
ENOUGH = 8
"""Points at which both must have a value, for a comparison to say anything."""
_SAME = 1e-9
_APART = 1e-6
_LARGEST_POWER = 50.0
_RANGES = {
    "f_c": (20, 80), "f_y": (300, 500), "phi_c": (0.5, 0.9), "phi_s": (0.6, 0.95),
    "lambda_": (0.7, 1), "alpha_1": (0.65, 0.85), "beta_1": (0.65, 0.95), "beta": (0.05, 0.4),
    "E_s": (1.8e5, 2.2e5), "E_c": (2e4, 4e4), "eps_cu": (0.003, 0.004), "eps_x": (1e-4, 3e-3),
    "eps_s": (1e-3, 1e-2), "l": (3e3, 1.2e4), "l_n": (3e3, 1.2e4), "l_w": (2e3, 8e3),
    "b_f": (900, 2500), "b": (600, 2500), "h": (700, 1000), "d": (500, 690),
    "d_p": (40, 80), "b_w": (250, 500), "h_f": (80, 160), "d_v": (300, 1200), "a": (20, 200),
    "c_c": (20, 50), "d_b": (11, 36), "d_bs": (8, 16),
}  # fmt: skip
"""Ranges of the commonest symbols [internal units]; in them every branch of a formula is met."""
_BY_KIND = {
    "length": (40, 600), "area": (100, 5000), "volume": (1e6, 1e8),
    "moment of inertia": (1e8, 1e10), "force": (1e4, 1e6), "moment": (1e7, 1e9),
    "load per length": (5, 80), "stress or pressure": (1, 400), "angle": (22, 50),
    "unit weight": (1.5e-5, 3e-5), "density": (1500, 2500), "area per length": (0.1, 2),
}  # fmt: skip


def points_for(names: Iterable[str], units: Mapping[str, str] | None = None) -> dict[str, Values]:
    """Return sample values by name [internal units]; ``units`` are those the notation lacks."""
    steps = np.arange(1, POINTS + 1)
    found = {}
    for name, prime in zip(sorted(set(names)), _primes(), strict=False):
        low, high = _range(name, units or {})
        found[name] = low + (high - low) * np.mod(steps * math.sqrt(prime), 1.0)
    return found


def is_usual(name: str, number: float) -> bool:
    """Tell whether a number may stand for a symbol, in internal units.

    >>> is_usual("beta", 0.18), is_usual("lambda_", 0.18)
    (True, False)
    """
    low, high = _range(name, {})
    return low <= number <= high


def _range(name: str, units: Mapping[str, str]) -> tuple[float, float]:
    if name in _RANGES:
        return _RANGES[name]
    unit = NOTATION[name].unit if name in NOTATION else units.get(name, "")
    return _BY_KIND.get(UNITS[unit].kind, (0.5, 3.0)) if unit in UNITS else (0.5, 3.0)


def _primes() -> Iterator[int]:
    return (n for n in count(2) if all(n % k for k in range(2, math.isqrt(n) + 1)))


def sampled(tree: Tree, points: Mapping[str, Values]) -> Values:
    """Return the values of a tree at the points; not a number where it has no real value."""
    with np.errstate(all="ignore"):
        return np.broadcast_to(_value(tree, points), (POINTS,)).astype(float)


def _value(tree: Tree, points: Mapping[str, Values]) -> Any:
    match tree:
        case Number(text):
            return np.float64(text)
        case Name(name):
            return points[name]
        case Negative(of):
            return -_value(of, points)
        case Binary(op, left, right):
            return _BINARY[op](_value(left, points), _value(right, points))
        case Call(function, args):
            return _FUNCTIONS[function](*[_value(arg, points) for arg in args])


def _power(base: Any, exponent: Any) -> Any:
    # An exponent of a hand's formula may be anything: beyond this it is no formula of ours.
    if np.ndim(exponent) == 0:
        return np.power(base, exponent) if abs(exponent) <= _LARGEST_POWER else np.nan
    return np.power(base, np.where(np.abs(exponent) <= _LARGEST_POWER, exponent, np.nan))


_BINARY: dict[str, Callable[[Any, Any], Any]] = {
    "+": np.add, "-": np.subtract, "*": np.multiply, "/": np.divide, "**": _power,
}  # fmt: skip
_FUNCTIONS: dict[str, Callable[..., Any]] = {
    "sqrt": np.sqrt,
    "cbrt": lambda x: np.where(x < 0, np.nan, np.cbrt(x)),
    "abs": np.abs,
    "min": lambda *args: reduce(np.minimum, args),
    "max": lambda *args: reduce(np.maximum, args),
    "sin": lambda x: np.sin(np.radians(x)),
    "cos": lambda x: np.cos(np.radians(x)),
    "tan": lambda x: np.tan(np.radians(x)),
    "cot": lambda x: 1 / np.tan(np.radians(x)),
}


def ratios(first: Values, second: Values) -> Values:
    """Return first over second where both have a value and the second is not zero."""
    usable = np.isfinite(first) & np.isfinite(second) & (second != 0)
    with np.errstate(all="ignore"):
        found: Values = first[usable] / second[usable]
    return found[np.isfinite(found)]


def constant_ratio(first: Values, second: Values) -> float | None:
    """Return the factor between two formulas if it is the same at every point, else None.

    >>> constant_ratio(np.arange(1.0, 25.0) * 3, np.arange(1.0, 25.0))
    3.0
    """
    # Two points tell nearly every pair apart, at a tenth of the cost of all.
    crossed, other = float(first[0] * second[1]), float(first[1] * second[0])
    if abs(crossed - other) > _APART * max(abs(crossed), abs(other)):
        return None
    held = np.isfinite(first) & np.isfinite(second)
    if np.count_nonzero(held) >= ENOUGH and np.array_equal(first[held], second[held]):
        return 1.0  # also where both are zero, so that there is no ratio
    found = ratios(first, second)
    if len(found) < ENOUGH or not np.any(found):
        return None
    middle = float(np.median(found))
    if np.max(np.abs(found - middle)) > _SAME * abs(middle):
        return None
    return float(f"{middle:.12g}")


def equal(first: Values, second: Values) -> bool:
    """Tell whether two formulas give the same at every point where both have a value."""
    factor = constant_ratio(first, second)
    return factor is not None and abs(factor - 1) <= _SAME


def power_of_ten(factor: float) -> int | None:
    """Return the exponent of a factor that is a power of ten, else None.

    >>> power_of_ten(1e-6), power_of_ten(1150.0)
    (-6, None)
    """
    if factor <= 0:
        return None
    exponent = round(math.log10(factor))
    return exponent if abs(factor / 10.0**exponent - 1) <= _SAME else None
