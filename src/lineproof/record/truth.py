"""Digits at which a printed comparison and its substitution have the recorded truth."""

from __future__ import annotations

from collections.abc import Sequence
from decimal import Decimal
from functools import lru_cache

from lineproof.formula import Criterion
from lineproof.formula.compiled import COMPARE, PLAIN_COMPARE
from lineproof.quantity.digits import ALL_DIGITS, MOST_KEPT, Argument, rounded_text, rounded_value
from lineproof.quantity.quick_digits import quick_text
from lineproof.quantity.units import UNITS, factor, power_of_ten


@lru_cache(maxsize=MOST_KEPT)
def in_unit(value: float, unit: str, digits: int) -> str:
    """Return an internal value printed in a unit to so many significant digits."""
    power = power_of_ten(unit, UNITS[unit].internal)
    quick = None if power is None else quick_text(value, digits, -power)
    if quick is not None:
        return quick
    # Divided as decimals: two floats that differ by their last bit must not become one.
    return rounded_text(Decimal(value) / factor(unit, UNITS[unit].internal), digits)


def truthful(
    test: Criterion, sides: tuple[float, float], digits: list[int], *, holds: bool
) -> list[int]:
    """Return the digits of both sides at which the printed comparison has its recorded truth.

    Rounded to the same digits, two numbers keep their order, so the shorter side grows first.
    """
    while True:
        left, right = (in_unit(value, test.unit, n) for value, n in zip(sides, digits, strict=True))
        printed = PLAIN_COMPARE[test.sign](Decimal(left), Decimal(right))
        if printed == holds or min(digits) >= ALL_DIGITS:
            return digits
        fewest = max(min(digits), 0)
        digits = [max(n, fewest + 1) for n in digits]


def true_substitution(
    test: Criterion, arguments: Sequence[Argument], digits: list[int], *, holds: bool
) -> list[int]:
    """Lengthen arguments until both sides, computed from them, compare as recorded."""
    while max(digits, default=ALL_DIGITS) < ALL_DIGITS:
        numbers = [
            a.exact if a.exact is not None else rounded_value(a.value, n)
            for a, n in zip(arguments, digits, strict=True)
        ]
        try:
            left, right = (side(*numbers) for side in test.functions)
            if COMPARE[test.sign](left, right) == holds:
                break
        except (ArithmeticError, ValueError, TypeError):
            pass
        digits = [n + 1 for n in digits]
    return digits
