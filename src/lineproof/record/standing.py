"""What stands of a value however often it is printed: its exact decimal, its least digits."""

from __future__ import annotations

from decimal import Decimal

from lineproof.formula import System
from lineproof.quantity.digits import (
    MOST_DIGITS,
    MOST_WANTED,
    START_DIGITS,
    Argument,
    number_text,
    rounded_text,
    significant,
    start_digits,
)
from lineproof.quantity.quick_digits import PLAIN_BELOW, quick_text
from lineproof.quantity.units import NOT_METRIC, UNITS, factor, power_of_ten, system_unit
from lineproof.record.entry import GIVEN, LINE, LOOKUP, Entry

_LONGEST_TYPED = 15
_LAST_BITS = 1e-11
"""Part of the largest of its terms below which a sum is nothing but rounding."""


def exact_decimal(entry: Entry) -> Decimal | None:
    """Return the exact decimal of a typed or looked-up value [internal unit].

    None for a computed value, and for one converted from a US unit into too many digits.
    """
    if entry.kind not in (GIVEN, LOOKUP):
        return None
    typed = entry.source.typed
    exact: Decimal = typed.exact
    longest = MOST_DIGITS if typed.unit in NOT_METRIC else _LONGEST_TYPED
    short = exact.normalize()
    return short if len(short.as_tuple().digits) <= longest else None


def left_of(entry: Entry) -> float | None:
    """Return the largest term of a line of which equal terms leave but the rounding of last bits.

    None for any other entry. The digits of such a rest mean nothing, and another processor has
    others: it is printed as nothing, at its own line and where it is used. In internal units.
    """
    if entry.kind != LINE or not entry.value:
        return None
    kind = UNITS[entry.unit].kind
    largest = max((abs(arg.value) for arg in entry.args if UNITS[arg.unit].kind == kind), default=0)
    return largest if abs(entry.value) < _LAST_BITS * largest else None


class Standing:
    """One value as an argument of other lines; each of its texts is made once."""

    __slots__ = ("_least", "_nothing", "_number", "_texts", "entry", "exact", "unit")

    def __init__(self, entry: Entry) -> None:
        self.entry = entry
        self.unit = entry.unit
        self.exact = exact_decimal(entry)
        self._nothing = left_of(entry) is not None
        self._number = None if self.exact is None else float(self.exact)
        if self._nothing:
            self._number = 0.0
        self._least = max(START_DIGITS, start_digits(entry.value, self.unit))
        self._texts: dict[tuple[int, str], str] = {}

    def argument(self, shown: int) -> Argument:
        """Return the value as an argument that shows so many digits at its own line."""
        return Argument(self.entry.value, min(max(shown, self._least), MOST_WANTED), self._number)

    def text(self, digits: int, system: System) -> str:
        """Return the value printed to so many digits in the units of a substitution."""
        known = self._texts.get((digits, system))
        if known is None:
            known = self._texts[digits, system] = self._made(digits, system)
        return known

    def _made(self, digits: int, system: System) -> str:
        if self._nothing:
            return "0"
        internal = UNITS[self.unit].internal
        target = system_unit(self.unit, system)
        if self.exact is None:
            power = power_of_ten(internal, target)
            quick = None if power is None else quick_text(self.entry.value, digits, power)
            if quick is not None:
                return quick
            return rounded_text(
                significant(self.entry.value, digits) * factor(internal, target), digits
            )
        return number_text(_whole((self.exact * factor(internal, target)).normalize()))


def _whole(exact: Decimal) -> Decimal:
    """Give an exact number its zeros back: 500e6, not 5e8."""
    power = 0 if exact.adjusted() < PLAIN_BELOW else exact.adjusted() // 3 * 3
    wide = int(exact.as_tuple().exponent) > power
    return exact.quantize(Decimal(1).scaleb(power)) if wide else exact
