"""Digits for print: every printed line can be recomputed from what is printed.

A printed number is a plain ASCII text that ``float`` reads back: ``7600``, ``-12.5``, ``5.00e9``.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from decimal import ROUND_HALF_UP, Context, Decimal
from functools import cache, lru_cache, partial
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
MOST_WANTED = 8
"""Digits that a value shows at most for the sake of the lines that use it."""
ALL_DIGITS = 17
"""Digits that tell any two floats apart."""
MOST_DECIMALS = 4
MINUS = "−"
"""The sign that is printed; records and what is typed have a hyphen in its place."""
MOST_KEPT = 16384
"""Rounded numbers that are kept: the lines of a beam use the same ones again and again."""
_EXACT = Context(prec=400, rounding=ROUND_HALF_UP)


@cache
def _context(digits: int) -> Context:
    return Context(prec=digits, rounding=ROUND_HALF_UP)


def significant(value: float | Decimal, digits: int) -> Decimal:
    """Return ``value`` rounded to ``digits`` significant digits, or to ``-digits`` decimals."""
    if digits <= 0:
        return Decimal(value).quantize(Decimal(1).scaleb(digits), context=_EXACT)
    return _context(digits).plus(Decimal(value))


@lru_cache(maxsize=MOST_KEPT)
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


def with_minus(text: str) -> str:
    """Return a number text with a true minus, as it stands in sentences, tables and figures.

    >>> with_minus("-12.5"), with_minus("2-25M")
    ('−12.5', '2-25M')
    """
    return f"{MINUS}{text[1:]}" if text.startswith("-") else text


def fixed(value: float, decimals: int) -> str:
    """Return a number for a sentence or figure with so many decimals; nothing has no sign.

    >>> fixed(-0.1, 2), fixed(-0.3, 0)
    ('−0.10', '0')
    """
    text = f"{value:.{decimals}f}"
    return with_minus(text) if text.strip("-0.") else text.lstrip("-")


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
    rounded: Callable[[int], float] | None = None,
) -> Chosen:
    """Choose the fewest digits so that the printed arguments give the printed result.

    Each number starts short. While the function of the printed arguments does not round to the
    printed result, the argument whose rounding moves the result most gains a digit, to six at
    most; only when none is left, and one digit more does not help (half way between two numbers),
    does the result give one up. A result that is nothing but the
    difference of roundings prints as 0.00; only where even that misses, or where the result must
    show ``needed`` digits, do arguments go beyond six.
    ``decimals`` asks for a result to so many decimals instead of significant digits;
    ``wanted`` asks for more digits than the start, for which arguments go to eight.
    ``rounded`` gives the result as it is printed to so many digits, where the float in ``unit``
    is not the very value that is printed: 8235000.0 N.mm lie half way, 8.235 below it.
    """
    start = max(start_digits(result, unit), needed)
    first = max(start, min(wanted, MOST_WANTED))
    substituted = _Substituted(function, args, result, rounded or partial(rounded_value, result))
    plain = decimals is None or bool(needed)
    if plain and substituted.gives(first):
        return Chosen(tuple(substituted.digits), first)
    most = MOST_WANTED if first > start else MOST_DIGITS
    fewer = [first] if needed else [first, first + 1, *range(first - 1, 0, -1)]
    fewer += [] if needed else range(-MOST_DECIMALS, 1)
    if decimals is not None and not needed:
        fewer = [*range(-decimals, 1)]
    for limit, digits in [*((most, n) for n in fewer), (ALL_DIGITS, needed or 1)]:
        if substituted.lengthened(digits, limit):
            return Chosen(tuple(substituted.digits), digits)
    return Chosen(tuple(substituted.digits), needed or 1)


class _Substituted:
    """A function of printed arguments, beside the result that it should give."""

    def __init__(
        self,
        function: Callable[..., float],
        args: Sequence[Argument],
        result: float,
        rounded: Callable[[int], float],
    ) -> None:
        self.digits = [a.digits for a in args]
        self._function, self._args = function, args
        self._result, self._rounded = result, rounded
        self._printed = [
            rounded_value(a.value, a.digits) if a.exact is None else a.exact for a in args
        ]
        self._moves: list[float | None] = []

    def gives(self, digits: int) -> bool:
        """Tell whether it rounds to the result printed to so many digits."""
        missed = abs(_call(self._function, self._printed) - self._rounded(digits))
        return missed <= last_unit(self._result, digits) / 2 * (1 + 1e-9)

    def lengthened(self, digits: int, limit: int) -> bool:
        """Lengthen arguments, to a limit, until it gives the result; tell whether it does."""
        while not self.gives(digits):
            at = self._most_moving(limit)
            if at is None:
                return False
            self.digits[at] += 1
            self._printed[at] = rounded_value(self._args[at].value, self.digits[at])
            self._moves[at] = self._move(at)
        return True

    def _most_moving(self, limit: int) -> int | None:
        """Return the argument whose rounding moves the result most, the first of equal ones."""
        self._moves = self._moves or [self._move(at) for at in range(len(self._args))]
        open_ = [
            (move, -at)
            for at, move in enumerate(self._moves)
            if move is not None and self.digits[at] < limit
        ]
        return -max(open_)[1] if open_ else None

    def _move(self, at: int) -> float | None:
        """Return how far rounding one argument alone moves the result; None if it is exact."""
        rounded = self._printed[at]
        if self._args[at].exact is not None or rounded == self._args[at].value:
            return None
        alone = [a.value for a in self._args]
        alone[at] = rounded
        return abs(_call(self._function, alone) - self._result)


def _call(function: Callable[..., float], args: Sequence[float]) -> float:
    try:
        value = function(*args)
    except (ArithmeticError, ValueError, TypeError):  # TypeError: a root of a negative compared
        return math.inf
    return value if isinstance(value, float) and not math.isnan(value) else math.inf
