"""Utilisation of a check: demand over resistance, as a number and as it is printed.

The printed ratio is that of the printed sides: who divides them gets it, to its last digit.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from decimal import Decimal

from lineproof.quantity.digits import ALL_DIGITS, START_DIGITS, rounded_text
from lineproof.record.entry import Entry
from lineproof.record.truth import in_unit

_DECIMALS = -2
"""Digits of a ratio below ten, as :func:`rounded_text` takes them: two decimals."""
_TEN = 9.995
_NO_MOVE = 1e-12
"""Relative distance of a printed side from its value that is no rounding."""


def utilisation(entry: Entry) -> float | None:
    """Return demand over resistance of a check, if demand >= 0 and resistance > 0."""
    left, right = entry.value
    return ratio(entry.source.sign, left, right)


def ratio(sign: str, left: float, right: float) -> float | None:
    """Return the utilisation of a comparison, or None where it would say nothing."""
    if sign in (">=", ">"):
        left, right = right, left
    if left < 0 or right <= 0:
        return None
    made = left / right
    return made if math.isfinite(made) else None


def ratio_digits(utilisation: float, *, holds: bool) -> int:
    """Return the digits of a printed ratio: at most 1 where the check holds, above where not."""
    start = _DECIMALS if utilisation < _TEN else START_DIGITS
    finer = range(_DECIMALS - 1, -ALL_DIGITS, -1)
    tries: list[int] = [start, *finer]
    for digits in tries:
        if (float(rounded_text(utilisation, digits)) <= 1) == holds:
            return digits
    # Demand and resistance are equal, and the check asks for less.
    return start


def printed_ratio(utilisation: float, sign: str, left: str, right: str, *, holds: bool) -> str:
    """Return a utilisation as it is printed beside the printed sides.

    >>> printed_ratio(0.5458, "<=", "298", "546", holds=True)
    '0.55'
    >>> printed_ratio(1.0004, "<=", "140.056", "140", holds=False)
    '1.0004'
    """
    digits = ratio_digits(utilisation, holds=holds)
    # Of a residual, which is cut to the decimals of its tolerance: the ratio of what is printed.
    text = ratio_of_texts(sign, left, right, digits)
    if text and (float(text) <= 1) == holds:
        return text
    return rounded_text(utilisation, digits)


def ratio_of_texts(sign: str, left: str, right: str, digits: int) -> str:
    """Return the ratio of two printed sides to so many digits; empty where there is none.

    >>> ratio_of_texts("<=", "115", "116", -2), ratio_of_texts(">=", "350", "345", -2)
    ('0.99', '0.99')
    """
    demand, resistance = Decimal(left), Decimal(right)
    if sign in (">=", ">"):
        demand, resistance = resistance, demand
    return rounded_text(demand / resistance, digits) if resistance else ""


def sides_for_ratio(
    sign: str, unit: str, sides: tuple[float, float], digits: Sequence[int], *, holds: bool
) -> list[int]:
    """Return the digits of both sides at which their printed quotient is the printed ratio.

    ``sides`` are internal values, printed in ``unit``. The side whose rounding moves the ratio most
    gains a digit. A residual (digits of zero or less) keeps its decimals.
    """
    shown, used = list(digits), ratio(sign, *sides)
    if used is None or min(shown) <= 0:
        return shown
    wanted = ratio_digits(used, holds=holds)
    text = rounded_text(used, wanted)
    while True:
        left, right = (in_unit(value, unit, n) for value, n in zip(sides, shown, strict=True))
        if ratio_of_texts(sign, left, right, wanted) == text:
            return shown
        moves = [
            (_moved(value, unit, n), -at)
            for at, (value, n) in enumerate(zip(sides, shown, strict=True))
            if n < ALL_DIGITS
        ]
        most, at = max(moves, default=(0.0, 0))
        if most <= _NO_MOVE:
            return shown
        shown[-at] += 1


def _moved(value: float, unit: str, digits: int) -> float:
    """Return the relative distance of a printed value from the value."""
    if not value:
        return 0.0
    exact = Decimal(in_unit(value, unit, ALL_DIGITS))
    return abs(float((Decimal(in_unit(value, unit, digits)) - exact) / exact))
