"""Digits for print: every printed line can be recomputed from what is printed.

A printed number is a plain ASCII text that ``float`` reads back: ``7600``, ``-12.5``, ``5.00e9``.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from decimal import ROUND_HALF_UP, Context, Decimal
from functools import cache
from typing import NamedTuple

from lineproof.quantity.quick_digits import (
    FEW_DIGITS,
    PLAIN_BELOW,
    PLAIN_FROM,
    quick_text,
    quick_value,
)

START_DIGITS = FEW_DIGITS
MOST_DIGITS = 6
ALL_DIGITS = 17
"""Digits that tell any two floats apart."""
MOST_DECIMALS = 4
_EXACT = Context(prec=400, rounding=ROUND_HALF_UP)


@cache
def _context(digits: int) -> Context:
    return Context(prec=digits, rounding=ROUND_HALF_UP)


def significant(value: float | Decimal, digits: int) -> Decimal:
    """Return ``value`` rounded to ``digits`` significant digits, or to ``-digits`` decimals."""
    if digits <= 0:
        return Decimal(value).quantize(Decimal(1).scaleb(digits), context=_EXACT)
    return _context(digits).plus(Decimal(value))


def rounded_value(value: float, digits: int) -> float:
    """Return :func:`significant` as a float: what a reader of the printed number reckons with."""
    quick = quick_value(value, digits)
    return float(significant(value, digits)) if quick is None else quick


def number_text(number: Decimal) -> str:
    """Return the printed text of a rounded decimal; powers of ten go by threes.

    At least three digits stand before zeros that only hold the place: 12300, but 12e3.

    >>> number_text(Decimal("551e6")), number_text(Decimal("0.140")), number_text(Decimal(0))
    ('551e6', '0.140', '0')
    >>> number_text(Decimal("2e-16")), number_text(Decimal("1.2e4"))
    ('2e-16', '12e3')
    """
    if not number:
        return "0"
    exponent = number.adjusted()
    rounded_away = int(number.as_tuple().exponent)
    few = rounded_away > 0 and len(number.as_tuple().digits) < START_DIGITS
    if PLAIN_FROM <= exponent < PLAIN_BELOW and not few:
        return f"{number:f}"
    power = exponent - exponent % 3
    if rounded_away > power:
        power = exponent  # 200e-18 would show digits that were rounded away
    return f"{number.scaleb(-power, _EXACT):f}e{power}"


def rounded_text(value: float | Decimal, digits: int) -> str:
    """Return ``value`` printed to ``digits`` significant digits.

    With ``digits`` of zero or less, to ``-digits`` decimals: ``0.00`` for what is nothing but the
    rounding of larger numbers.

    >>> rounded_text(5e9, 3), rounded_text(0.00085, 3), rounded_text(2.5, 3)
    ('5.00e9', '0.000850', '2.50')
    >>> rounded_text(0.0004, -2), rounded_text(0.0, 3)
    ('0.00', '0')
    """
    quick = quick_text(value, digits) if isinstance(value, float) else None
    if quick is not None:
        return quick
    number = significant(value, digits)
    if digits <= 0:
        return f"{number or abs(number):f}"
    if number and number.adjusted() + 1 < digits:
        number = number.quantize(Decimal(1).scaleb(number.adjusted() - digits + 1), context=_EXACT)
    return number_text(number)


def start_digits(value: float, unit: str) -> int:
    """Return the digits a value starts with: three, and whole millimetres for sizes."""
    if unit == "mm" and abs(value) >= 1000:  # noqa: PLR2004 - four digits before the point
        return min(MOST_DIGITS, int(math.log10(abs(value))) + 1)
    return START_DIGITS


def digits_in(text: str) -> int:
    """Return how many significant digits a printed number shows.

    >>> digits_in("7600"), digits_in("0.140"), digits_in("5.00e9")
    (4, 3, 3)
    """
    mantissa = text.lower().partition("e")[0].lstrip("+-").replace(".", "")
    return len(mantissa.lstrip("0")) or 1


def last_unit(value: float, digits: int) -> float:
    """Return one unit of the last of ``digits`` significant digits (or decimals) of ``value``."""
    if digits <= 0:
        return 10.0**digits
    return 10.0 ** (math.floor(math.log10(abs(value))) - digits + 1) if value else 0.0


class Argument(NamedTuple):
    """An argument of a printed line: its value, and either its exact print or its least digits."""

    value: float
    digits: int
    exact: float | None = None


class Chosen(NamedTuple):
    """Significant digits per argument and for the result (zero or less: decimals, negated)."""

    args: tuple[int, ...]
    result: int


def choose_digits(
    function: Callable[..., float],
    args: Sequence[Argument],
    result: float,
    unit: str,
    needed: int = 0,
    decimals: int | None = None,
    wanted: int = 0,
) -> Chosen:
    """Choose the fewest digits so that the printed arguments give the printed result.

    Each number starts short. While the function of the printed arguments does not round to the
    printed result, the argument whose rounding moves the result most gains a digit, to six at
    most; only when none is left does the result give one up. A result that is nothing but the
    difference of roundings prints as 0.00; only where even that misses, or where the result must
    show ``needed`` digits, do arguments go beyond six.
    ``decimals`` asks for a result to so many decimals instead of significant digits;
    ``wanted`` asks for more digits than the start, as far as they can be had.
    """
    first = max(start_digits(result, unit), needed, min(wanted, MOST_DIGITS))
    digits = [a.digits for a in args]
    plain = decimals is None or needed
    if plain and _agrees(function, _printed(args, digits), result, first):
        return Chosen(tuple(digits), first)
    fewer = [first] if needed else [*range(first, 0, -1), *range(-MOST_DECIMALS, 1)]
    if decimals is not None and not needed:
        fewer = [*range(-decimals, 1)]
    for limit, result_digits in [*((MOST_DIGITS, n) for n in fewer), (ALL_DIGITS, needed or 1)]:
        while not _agrees(function, _printed(args, digits), result, result_digits):
            longest = _most_moving(function, args, digits, result, limit)
            if longest is None:
                break
            digits[longest] += 1
        else:
            return Chosen(tuple(digits), result_digits)
    return Chosen(tuple(digits), needed or 1)


def _printed(args: Sequence[Argument], digits: Sequence[int]) -> list[float]:
    return [
        a.exact if a.exact is not None else rounded_value(a.value, n)
        for a, n in zip(args, digits, strict=True)
    ]


def _agrees(
    function: Callable[..., float], printed: Sequence[float], result: float, digits: int
) -> bool:
    shown = rounded_value(result, digits)
    missed = abs(_call(function, printed) - shown)
    return missed <= last_unit(result, digits) / 2 * (1 + 1e-9)


def _call(function: Callable[..., float], args: Sequence[float]) -> float:
    try:
        value = function(*args)
    except (ArithmeticError, ValueError, TypeError):  # TypeError: a root of a negative compared
        return math.inf
    return value if isinstance(value, float) and not math.isnan(value) else math.inf


def _most_moving(
    function: Callable[..., float],
    args: Sequence[Argument],
    digits: Sequence[int],
    result: float,
    limit: int,
) -> int | None:
    exact = [a.value for a in args]
    moves = []
    for i, (argument, n) in enumerate(zip(args, digits, strict=True)):
        rounded = rounded_value(argument.value, n)
        if argument.exact is None and n < limit and rounded != argument.value:
            alone = [*exact[:i], rounded, *exact[i + 1 :]]
            moves.append((abs(_call(function, alone) - result), -i))
    return -max(moves)[1] if moves else None
