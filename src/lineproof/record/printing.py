"""Printed strings of entries, fixed when the record closes."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass, replace
from decimal import Decimal
from typing import Any

from lineproof.formula import Criterion, Formula, Name, Number, System
from lineproof.quantity.digits import (
    ALL_DIGITS,
    MOST_DECIMALS,
    MOST_DIGITS,
    PLAIN_BELOW,
    START_DIGITS,
    Argument,
    Chosen,
    choose_digits,
    digits_in,
    number_text,
    rounded_text,
    significant,
    start_digits,
)
from lineproof.quantity.units import NOT_METRIC, UNITS, factor, internal_factor, system_unit
from lineproof.record.entry import FOUND, GIVEN, LINE, LOOKUP, Entry
from lineproof.record.truth import in_unit, true_substitution, truthful

__all__ = ["Printer", "exact_decimal", "in_unit", "ratio", "utilisation"]

_LONGEST_TYPED = 15
_RESIDUAL = 0.01
"""Share of the other side below which a side is but the residual of nearly equal numbers."""
_NOTHING = 0.001
"""Utilisation below which 0.00 is printed."""


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


@dataclass(frozen=True, slots=True)
class _Kept:
    """What was printed of an entry, the digits it rests on, and those that it asks for."""

    rests_on: tuple[int | None, ...]
    printed: dict[str, Any]
    digits: int | None
    uses: tuple[tuple[Entry, int], ...]


class Printer:
    """Prints entries one after the other, remembering the digits each shows at its own line.

    A later line may need more digits of a value than its own line shows. ``wanted`` holds what a
    pass before this one found, by entry, so that a value reads the same wherever it stands;
    ``used`` holds what this pass finds; ``digits`` those that entries printed before have shown.
    What nothing has changed for since the pass before is taken from there.
    """

    def __init__(
        self,
        wanted: Mapping[int, int] | None = None,
        digits: Mapping[int, int] | None = None,
        kept: dict[tuple[int, str], _Kept] | None = None,
    ) -> None:
        self.digits: dict[int, int] = dict(digits or {})
        self._begun = dict(self.digits)
        self._wanted = dict(wanted or {})
        self._kept = {} if kept is None else kept
        self._uses: list[tuple[Entry, int]] = []
        self.used: dict[int, int] = {}

    def settled(self) -> bool:
        """Tell whether this pass asked for nothing that it had not been told."""
        return self._needed() == self._wanted

    def following(self) -> Printer:
        """Return the printer of another pass, told what this one asked for."""
        return Printer(self._needed(), self._begun, self._kept)

    def _needed(self) -> dict[int, int]:
        return {key: max(n, self._wanted.get(key, 0)) for key, n in self.used.items()}

    def _note_use(self, entry: Entry, digits: int) -> None:
        if entry.kind in (LINE, FOUND, GIVEN):
            self._uses.append((entry, digits))

    def _once(
        self, entry: Entry, what: str, args: Sequence[Entry], make: Callable[[], dict[str, Any]]
    ) -> dict[str, Any]:
        """Print something of an entry, unless it was printed before resting on the same digits."""
        own = id(entry)
        rests_on = (self._wanted.get(own, 0), *(self.digits.get(id(a)) for a in args))
        kept = self._kept.get((own, what))
        if kept is None or kept.rests_on != rests_on:
            self._uses = []
            printed = make()
            kept = _Kept(rests_on, printed, self.digits.get(own), tuple(self._uses))
            self._kept[own, what] = kept
        if kept.digits is not None:
            self.digits[own] = kept.digits
        for used, digits in kept.uses:
            self.used[id(used)] = max(digits, self.used.get(id(used), 0))
        return kept.printed

    def printed(self, entry: Entry) -> dict[str, Any]:
        """Return the printed strings of a given, lookup, line or found value."""
        return self._once(entry, "value", entry.args, lambda: self._value(entry))

    def criterion(self, entry: Entry, utilisation: float | None) -> dict[str, Any]:
        """Return the printed strings of a decision or a check."""
        holds = bool(entry)
        made = self.comparison(entry, entry.source, entry.args, entry.value, holds=holds)
        ratio = {} if utilisation is None else {"utilisation": _ratio(utilisation, holds=holds)}
        return made | ratio

    def comparison(
        self,
        entry: Entry,
        test: Criterion,
        args: Sequence[Entry],
        sides: tuple[float, float],
        *,
        holds: bool,
    ) -> dict[str, Any]:
        """Return both sides of a comparison of an entry, as :meth:`_compared` prints them."""
        return self._once(
            entry, "comparison", args, lambda: self._compared(test, args, sides, holds=holds)
        )

    def _value(self, entry: Entry) -> dict[str, Any]:
        if entry.kind == GIVEN:
            made = _given(entry, self._wanted.get(id(entry), 0))
            self.digits[id(entry)] = digits_in(made["result"])
        elif entry.kind == LOOKUP:
            made = {"result": entry.source.typed.number, "unit": entry.source.unit}
        elif entry.kind == FOUND:
            made = self._found(entry)
        else:
            made = self._line(entry)
        return made

    def _compared(
        self, test: Criterion, args: Sequence[Entry], sides: tuple[float, float], *, holds: bool
    ) -> dict[str, Any]:
        """Return both sides printed so that the printed comparison has the recorded truth.

        The same goes for the substitution: both formulas of the printed arguments.
        """
        arguments = [self._argument(a) for a in args]
        chosen = [
            self._side(place, test, args, arguments, value, other=other)
            for place, (value, other) in enumerate(zip(sides, reversed(sides), strict=True))
        ]
        needed = truthful(test, sides, [c.result for c in chosen], holds=holds)
        chosen = [
            c if n == c.result else self._side(place, test, args, arguments, value, needed=n)
            for place, (value, c, n) in enumerate(zip(sides, chosen, needed, strict=True))
        ]
        shown = [max(pair) for pair in zip(*(c.args for c in chosen), strict=True)]
        shown = true_substitution(test, arguments, shown, holds=holds)
        left, right = (in_unit(v, test.unit, n) for v, n in zip(sides, needed, strict=True))
        for arg, digits in zip(args, shown, strict=True):
            self._note_use(arg, digits)
        texts = {
            name: _argument_text(arg, argument, n, test.system)
            for name, arg, argument, n in zip(test.names, args, arguments, shown, strict=True)
        }
        return {"args": texts, "left": left, "right": right, "unit": test.unit}

    def _side(
        self,
        place: int,
        test: Criterion,
        args: Sequence[Entry],
        arguments: Sequence[Argument],
        value: float,
        *,
        needed: int = 0,
        other: float = 0.0,
    ) -> Chosen:
        tree = (test.left, test.right)[place]
        if isinstance(tree, Name):
            at = test.names.index(tree.id)
            exact = exact_decimal(args[at])
            own = self.digits.get(id(args[at]), START_DIGITS)
            digits = needed or (_shown_digits(exact, args[at], test.unit) if exact else own)
            shown = [a.digits for a in arguments]
            shown[at] = max(shown[at], digits)
            return Chosen(tuple(shown), digits)
        if isinstance(tree, Number) and internal_factor(test.unit) == 1:
            return Chosen(tuple(a.digits for a in arguments), needed or digits_in(tree.text))
        scale = internal_factor(test.unit)
        compiled = test.functions[place]
        return choose_digits(
            lambda *numbers: compiled(*numbers) / scale,
            arguments, value / scale, test.unit, max(needed, 0),
            decimals=_residual_decimals(value / scale, other / scale),
        )  # fmt: skip

    def _argument(self, entry: Entry) -> Argument:
        exact = exact_decimal(entry)
        own = self.digits.get(id(entry), START_DIGITS)
        start = max(START_DIGITS, own, start_digits(entry.value, entry.unit))
        return Argument(
            entry.value, min(start, MOST_DIGITS), None if exact is None else float(exact)
        )

    def _line(self, entry: Entry) -> dict[str, Any]:
        made: Formula = entry.source
        unit, target = entry.unit, system_unit(entry.unit, made.system)
        arguments = [self._argument(a) for a in entry.args]
        wanted = self._wanted.get(id(entry), 0)
        chosen = _choose(made, arguments, entry.value, unit, wanted)
        coherent = chosen.result
        if not _by_powers_of_ten(unit, target):
            # The result in two unlike units: both must follow from the printed arguments.
            arguments = _longer(arguments, chosen)
            between = _choose(made, arguments, entry.value, target)
            chosen = _choose(made, _longer(arguments, between), entry.value, unit)
            coherent = between.result
        texts = {
            name: _argument_text(arg, argument, digits, made.system)
            for name, arg, argument, digits in zip(
                made.names, entry.args, arguments, chosen.args, strict=True
            )
        }
        for arg, digits in zip(entry.args, chosen.args, strict=True):
            self._note_use(arg, digits)
        self.digits[id(entry)] = chosen.result
        return {
            "args": texts,
            "result": in_unit(entry.value, unit, chosen.result),
            "unit": unit,
            "coherent": _coherent(entry.value, unit, target, coherent),
        }

    def _found(self, entry: Entry) -> dict[str, Any]:
        least = max(4, start_digits(entry.value, entry.unit))
        digits = max(least, self._wanted.get(id(entry), 0))
        self.digits[id(entry)] = digits
        texts = {
            name: _argument_text(arg, argument, argument.digits, "N-mm")
            for name, arg in zip(entry.source.names, entry.args, strict=True)
            for argument in [self._argument(arg)]
        }
        return {
            "args": texts,
            "result": in_unit(entry.value, entry.unit, digits),
            "unit": entry.unit,
        }


def _residual_decimals(value: float, other: float) -> int | None:
    """Return the decimals for a residual: to the first digit of the tolerance beside it.

    A residual is what two nearly equal numbers leave; its own digits are those of their rounding.
    """
    if abs(value) >= _RESIDUAL * abs(other):
        return None
    return min(max(0, -math.floor(math.log10(abs(other)))), MOST_DECIMALS)


def _shown_digits(exact: Decimal, entry: Entry, unit: str) -> int:
    """Return the digits of an exact value in a unit, zeros before the point included: 140, 30."""
    text = entry.source.typed.number if entry.unit == unit else ""
    whole = (exact / factor(unit, UNITS[unit].internal)).adjusted() + 1
    return max(
        len(exact.as_tuple().digits), digits_in(text) if text else 1, min(whole, MOST_DIGITS)
    )


def _choose(
    made: Formula, arguments: Sequence[Argument], value: float, unit: str, wanted: int = 0
) -> Chosen:
    scale = internal_factor(unit)
    return choose_digits(
        lambda *numbers: made.function(*numbers) / scale,
        arguments, value / scale, unit, wanted=wanted,
    )  # fmt: skip


def _longer(arguments: Sequence[Argument], chosen: Chosen) -> list[Argument]:
    return [replace(a, digits=n) for a, n in zip(arguments, chosen.args, strict=True)]


def _by_powers_of_ten(unit: str, target: str) -> bool:
    return factor(unit, target).normalize().as_tuple().digits == (1,)


def _given(entry: Entry, wanted: int) -> dict[str, Any]:
    typed = entry.source.typed
    if typed.unit not in NOT_METRIC:
        return {"result": typed.number, "unit": typed.unit}
    digits = START_DIGITS
    exact = exact_decimal(entry)
    digits = max(digits, wanted if exact is None else len(exact.as_tuple().digits))
    return {
        "typed": typed.number,
        "typed_unit": typed.unit,
        "result": in_unit(typed.value, entry.unit, digits),
        "unit": entry.unit,
    }


def _argument_text(entry: Entry, argument: Argument, digits: int, system: System) -> str:
    unit = entry.unit
    target = system_unit(unit, system)
    shift = factor(UNITS[unit].internal, target)
    exact = exact_decimal(entry)
    if exact is not None:
        return number_text(_whole((exact * shift).normalize()))
    rounded = significant(argument.value, digits) * shift
    return rounded_text(rounded, digits)


def _whole(exact: Decimal) -> Decimal:
    """Give an exact number its zeros back: 500e6, not 5e8."""
    power = 0 if exact.adjusted() < PLAIN_BELOW else exact.adjusted() // 3 * 3
    wide = int(exact.as_tuple().exponent) > power
    return exact.quantize(Decimal(1).scaleb(power)) if wide else exact


def _coherent(value: float, unit: str, target: str, digits: int) -> dict[str, str] | None:
    if target == unit or factor(unit, target) == 1 or digits <= 0:
        return None
    return {"result": in_unit(value, target, digits), "unit": target}


def _ratio(utilisation: float, *, holds: bool) -> str:
    if 0 < utilisation < _NOTHING and holds:
        return "0.00"
    for digits in range(START_DIGITS, ALL_DIGITS + 1):
        text = rounded_text(utilisation, digits)
        if (float(text) <= 1) == holds:
            return text
    # Demand and resistance are equal, and the check asks for less.
    return rounded_text(utilisation, START_DIGITS)


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
