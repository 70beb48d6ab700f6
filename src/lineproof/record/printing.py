"""Printed strings of entries, fixed when the record closes."""

from __future__ import annotations

import math
from collections.abc import Mapping, Sequence
from dataclasses import replace
from decimal import Decimal
from typing import Any

from lineproof.formula import Criterion, Formula, Name, Number, System, Tree
from lineproof.formula.compiled import COMPARE, PLAIN_COMPARE, compile_tree
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


def in_unit(value: float, unit: str, digits: int) -> str:
    """Return an internal value printed in a unit to so many significant digits."""
    # Divided as decimals: two floats that differ by their last bit must not become one.
    return rounded_text(Decimal(value) / factor(unit, UNITS[unit].internal), digits)


class Printer:
    """Prints entries one after the other, remembering the digits each shows at its own line.

    A later line may need more digits of a value than its own line shows. ``wanted`` holds what a
    pass before this one found, by entry, so that a value reads the same wherever it stands;
    ``used`` holds what this pass finds; ``digits`` those that entries printed before have shown.
    """

    def __init__(
        self, wanted: Mapping[int, int] | None = None, digits: Mapping[int, int] | None = None
    ) -> None:
        self.digits: dict[int, int] = dict(digits or {})
        self._wanted = dict(wanted or {})
        self.used: dict[int, int] = {}

    def _note_use(self, entry: Entry, digits: int) -> None:
        if entry.kind in (LINE, FOUND, GIVEN):
            self.used[id(entry)] = max(digits, self.used.get(id(entry), 0))

    def printed(self, entry: Entry) -> dict[str, Any]:
        """Return the printed strings of a given, lookup, line or found value."""
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

    def criterion(self, entry: Entry, utilisation: float | None) -> dict[str, Any]:
        """Return the printed strings of a decision or a check."""
        made = self.comparison(entry.source, entry.args, entry.value, holds=bool(entry))
        if utilisation is not None:
            made["utilisation"] = _ratio(utilisation, holds=bool(entry))
        return made

    def comparison(
        self, test: Criterion, args: Sequence[Entry], sides: tuple[float, float], *, holds: bool
    ) -> dict[str, Any]:
        """Return both sides printed so that the printed comparison has the recorded truth.

        The same goes for the substitution: both formulas of the printed arguments.
        """
        arguments = [self._argument(a) for a in args]
        trees = (test.left, test.right)
        chosen = [
            self._side(tree, test, args, arguments, value, other=other)
            for tree, value, other in zip(trees, sides, reversed(sides), strict=True)
        ]
        needed = _truthful(test, sides, [c.result for c in chosen], holds=holds)
        chosen = [
            c if n == c.result else self._side(tree, test, args, arguments, value, needed=n)
            for tree, value, c, n in zip(trees, sides, chosen, needed, strict=True)
        ]
        shown = [max(pair) for pair in zip(*(c.args for c in chosen), strict=True)]
        shown = _true_substitution(test, arguments, shown, holds=holds)
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
        tree: Tree,
        test: Criterion,
        args: Sequence[Entry],
        arguments: Sequence[Argument],
        value: float,
        *,
        needed: int = 0,
        other: float = 0.0,
    ) -> Chosen:
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
        compiled = compile_tree(tree, test.names)
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


def _truthful(
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


def _true_substitution(
    test: Criterion, arguments: Sequence[Argument], digits: list[int], *, holds: bool
) -> list[int]:
    """Lengthen arguments until both sides, computed from them, compare as recorded."""
    while max(digits, default=ALL_DIGITS) < ALL_DIGITS:
        numbers = [
            a.exact if a.exact is not None else float(significant(a.value, n))
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
