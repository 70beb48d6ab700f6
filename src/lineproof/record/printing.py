"""Printed strings of entries, fixed when the record closes."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping, Sequence
from decimal import Decimal
from typing import Any

from lineproof.formula import Criterion, Formula, Name, Number
from lineproof.quantity.digits import (
    MOST_DECIMALS,
    MOST_DIGITS,
    MOST_WANTED,
    START_DIGITS,
    Argument,
    Chosen,
    choose_digits,
    digits_in,
    start_digits,
)
from lineproof.quantity.units import (
    NOT_METRIC,
    UNITS,
    factor,
    internal_factor,
    power_of_ten,
    system_unit,
)
from lineproof.record.entry import CHECK, CRITERIA, FOUND, GIVEN, LINE, LOOKUP, VALUES, Entry
from lineproof.record.standing import Standing, exact_decimal, left_of
from lineproof.record.truth import in_unit, true_substitution, truthful
from lineproof.record.utilisation import printed_ratio, ratio, sides_for_ratio, utilisation

__all__ = ["Printer", "exact_decimal", "in_unit", "ratio", "utilisation"]

MOST_PASSES = 24
"""Passes of printing at most; the demo beam settles in eight."""
_RESIDUAL = 0.01
"""Share of the other side below which a side is but the residual of nearly equal numbers."""
_LEAST_FOUND = 4
"""Digits that a found value shows at least."""


class _Print:
    """One print: of a value, or of the two sides of a comparison; as the last pass left it."""

    __slots__ = ("args", "due", "entry", "sides", "strings", "test", "uses")

    def __init__(
        self,
        entry: Entry,
        args: tuple[Entry, ...],
        test: Criterion | None = None,
        sides: tuple[float, float] = (0.0, 0.0),
    ) -> None:
        self.entry, self.args, self.test, self.sides = entry, args, test, sides
        self.strings: dict[str, Any] = {}
        self.uses: tuple[tuple[int, int], ...] = ()
        self.due = True


class Printer:
    """Prints entries in their order, in passes, remembering the digits each shows at its own line.

    A later line may need more digits of a value than its own line shows. What a pass finds is
    told to the one after it, so that a value reads the same wherever it stands; a pass prints
    again only what something has changed for. ``shown`` are the digits that values printed
    before have shown, by the id of the object; ``digits`` those of these as well.
    """

    def __init__(self, entries: Sequence[Entry], shown: Mapping[int, int] | None = None) -> None:
        self.digits = dict(shown or {})
        self._wanted: dict[int, int] = {}
        self._standing: dict[int, Standing] = {}
        self._values: dict[int, _Print] = {}
        self._comparisons: dict[int, _Print] = {}
        self._prints = self._laid_out(entries)
        self._users: dict[int, list[_Print]] = {}
        for one in self._prints:
            for key in {id(arg) for arg in one.args}:
                self._users.setdefault(key, []).append(one)
        self._settle()

    def value(self, entry: Entry) -> dict[str, Any]:
        """Return the printed strings of a given, lookup, line or found value."""
        return self._values[id(entry)].strings

    def comparison(self, entry: Entry) -> dict[str, Any]:
        """Return both sides of the comparison of a decision, a check or a found value."""
        return self._comparisons[id(entry)].strings

    def criterion(self, entry: Entry, utilisation: float | None) -> dict[str, Any]:
        """Return the printed strings of a decision or a check."""
        made = self.comparison(entry)
        if utilisation is None:
            return made
        sign, left, right = entry.source.sign, made["left"], made["right"]
        text = printed_ratio(utilisation, sign, left, right, holds=bool(entry))
        return made | {"utilisation": text}

    # -- passes ------------------------------------------------------------------------------

    def _laid_out(self, entries: Sequence[Entry]) -> list[_Print]:
        """Return what is printed, in order: each entry, and after a found value its closing."""
        made: list[_Print] = []
        for entry in entries:
            if entry.kind in VALUES:
                self._values[id(entry)] = _Print(entry, entry.args)
                made.append(self._values[id(entry)])
            if entry.kind in CRITERIA:
                one = _Print(entry, entry.args, entry.source, entry.value)
                made.append(one)
                self._comparisons[id(entry)] = one
            elif entry.kind == FOUND:
                extra = entry.extra or {}
                args, sides = extra["closing_args"], extra["closing_sides"]
                one = _Print(entry, args, entry.source.closing, sides)
                made.append(one)
                self._comparisons[id(entry)] = one
        return made

    def _settle(self) -> None:
        """Print until no line asks for more digits of a value, and each shows them everywhere."""
        for _ in range(MOST_PASSES - 1):
            asked = self._pass()
            more = self._tell(asked)
            if not (more or any(one.due for one in self._prints)):
                break
        self._pass()

    def _pass(self) -> dict[int, int]:
        """Print what is due, in order; return the most digits it newly asks for, by value."""
        asked: dict[int, int] = {}
        for one in self._prints:
            if not one.due:
                continue
            own, before = id(one.entry), one.uses
            shown = self.digits.get(own)
            self._print(one)
            one.due = False
            if one.uses != before:
                for key, digits in one.uses:
                    asked[key] = max(digits, asked.get(key, digits))
            if self.digits.get(own) != shown:
                for user in self._users.get(own, ()):
                    user.due = True
        return asked

    def _tell(self, asked: Mapping[int, int]) -> bool:
        """Take over the digits asked for; tell whether any value is to show more than before."""
        more = False
        for key, needed in asked.items():
            before = self._wanted.get(key)
            if before is not None and needed <= before:
                continue
            self._wanted[key] = needed
            more = True
            one = self._values.get(key)
            if one is not None and _starts(one.entry, needed) != _starts(one.entry, before):
                one.due = True
        return more

    def _print(self, one: _Print) -> None:
        if one.test is not None:
            one.strings, shown = self._compared(one, one.test)
        else:
            one.strings, shown = self._value(one.entry)
        one.uses = tuple(
            (id(arg), digits)
            for arg, digits in zip(one.args, shown, strict=False)
            if arg.kind != LOOKUP
        )

    # -- one print ---------------------------------------------------------------------------

    def _stands(self, entry: Entry) -> Standing:
        found = self._standing.get(id(entry))
        if found is None:
            found = self._standing[id(entry)] = Standing(entry)
        return found

    def _shown(self, entry: Entry) -> int:
        """Return the digits that an argument has shown so far in this pass."""
        return self.digits.get(id(entry), START_DIGITS)

    def _arguments(self, args: Sequence[Entry]) -> list[Argument]:
        return [self._stands(arg).argument(self._shown(arg)) for arg in args]

    def _value(self, entry: Entry) -> tuple[dict[str, Any], Sequence[int]]:
        """Return the strings of a value, and the digits that they ask of its arguments."""
        if entry.kind == GIVEN:
            made = _given(entry, self._wanted.get(id(entry), 0))
            self.digits[id(entry)] = digits_in(made["result"])
            return made, ()
        if entry.kind == LOOKUP:
            return {"result": entry.source.typed.number, "unit": entry.source.unit}, ()
        if entry.kind == FOUND:
            return self._found(entry), ()
        return self._line(entry)

    def _compared(self, one: _Print, test: Criterion) -> tuple[dict[str, Any], Sequence[int]]:
        """Return both sides printed so that the printed comparison has the recorded truth.

        The same goes for the substitution: both formulas of the printed arguments.
        """
        args, sides = one.args, one.sides
        holds = test.holds(*sides)
        arguments = self._arguments(args)
        chosen = [
            self._side(place, test, args, arguments, value, other=other)
            for place, (value, other) in enumerate(zip(sides, reversed(sides), strict=True))
        ]
        needed = truthful(test, sides, [c.result for c in chosen], holds=holds)
        if one.entry.kind == CHECK:
            needed = sides_for_ratio(test.sign, test.unit, sides, needed, holds=holds)
        chosen = [
            c if n == c.result else self._side(place, test, args, arguments, value, needed=n)
            for place, (value, c, n) in enumerate(zip(sides, chosen, needed, strict=True))
        ]
        shown = [max(pair) for pair in zip(*(c.args for c in chosen), strict=True)]
        shown = true_substitution(test, arguments, shown, holds=holds)
        left, right = (in_unit(v, test.unit, n) for v, n in zip(sides, needed, strict=True))
        texts = {
            name: self._stands(arg).text(n, test.system)
            for name, arg, n in zip(test.names, args, shown, strict=True)
        }
        return {"args": texts, "left": left, "right": right, "unit": test.unit}, shown

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
            exact = self._stands(args[at]).exact
            own = self._shown(args[at])
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
            rounded=_rounding(value, test.unit),
        )  # fmt: skip

    def _line(self, entry: Entry) -> tuple[dict[str, Any], Sequence[int]]:
        made: Formula = entry.source
        unit = entry.unit
        target = system_unit(unit, made.system)
        arguments = self._arguments(entry.args)
        wanted = self._wanted.get(id(entry), 0)
        chosen = _choose(made, arguments, entry.value, unit, wanted, _left_over(entry))
        coherent = chosen.result
        if power_of_ten(unit, target) is None:
            # The result in two unlike units: both must follow from the printed arguments.
            arguments = _longer(arguments, chosen)
            between = _choose(made, arguments, entry.value, target)
            chosen = _choose(made, _longer(arguments, between), entry.value, unit)
            coherent = between.result
        texts = {
            name: self._stands(arg).text(digits, made.system)
            for name, arg, digits in zip(made.names, entry.args, chosen.args, strict=True)
        }
        self.digits[id(entry)] = chosen.result
        return {
            "args": texts,
            "result": in_unit(entry.value, unit, chosen.result),
            "unit": unit,
            "coherent": _coherent(entry.value, unit, target, coherent),
        }, chosen.args

    def _found(self, entry: Entry) -> dict[str, Any]:
        least = max(_LEAST_FOUND, start_digits(entry.value, entry.unit))
        digits = max(least, self._wanted.get(id(entry), 0))
        self.digits[id(entry)] = digits
        arguments = self._arguments(entry.args)
        texts = {
            name: self._stands(arg).text(argument.digits, "N-mm")
            for name, arg, argument in zip(entry.source.names, entry.args, arguments, strict=True)
        }
        return {
            "args": texts,
            "result": in_unit(entry.value, entry.unit, digits),
            "unit": entry.unit,
        }


def _starts(entry: Entry, wanted: int | None) -> int:
    """Return the digits that a value starts with at its own line when others want so many."""
    wanted = wanted or 0
    if entry.kind == LINE:
        first = start_digits(entry.value / internal_factor(entry.unit), entry.unit)
        return max(first, min(wanted, MOST_WANTED))
    return max(_LEAST_FOUND, wanted) if entry.kind == FOUND else wanted


def _residual_decimals(value: float, other: float) -> int | None:
    """Return the decimals for a residual: to the first digit of the tolerance beside it.

    A residual is what two nearly equal numbers leave; its own digits are those of their rounding.
    """
    if abs(value) >= _RESIDUAL * abs(other):
        return None
    return min(max(0, -math.floor(math.log10(abs(other)))), MOST_DECIMALS)


def _left_over(entry: Entry) -> int | None:
    """Return the decimals of a line of which equal terms leave but the rounding of last bits."""
    largest = left_of(entry)
    if largest is None:
        return None
    scale = internal_factor(entry.unit)
    return _residual_decimals(entry.value / scale, largest / scale)


def _shown_digits(exact: Decimal, entry: Entry, unit: str) -> int:
    """Return the digits of an exact value in a unit, zeros before the point included: 140, 30."""
    text = entry.source.typed.number if entry.unit == unit else ""
    whole = (exact / factor(unit, UNITS[unit].internal)).adjusted() + 1
    return max(
        len(exact.as_tuple().digits), digits_in(text) if text else 1, min(whole, MOST_DIGITS)
    )


def _choose(
    made: Formula,
    arguments: Sequence[Argument],
    value: float,
    unit: str,
    wanted: int = 0,
    decimals: int | None = None,
) -> Chosen:
    scale = internal_factor(unit)
    return choose_digits(
        lambda *numbers: made.function(*numbers) / scale,
        arguments, value / scale, unit, wanted=wanted, decimals=decimals,
        rounded=_rounding(value, unit),
    )  # fmt: skip


def _rounding(value: float, unit: str) -> Callable[[int], float]:
    """Return what gives an internal value as it is printed in a unit to so many digits."""
    return lambda digits: float(in_unit(value, unit, digits))


def _longer(arguments: Sequence[Argument], chosen: Chosen) -> list[Argument]:
    return [a._replace(digits=n) for a, n in zip(arguments, chosen.args, strict=True)]


def _given(entry: Entry, wanted: int) -> dict[str, Any]:
    typed = entry.source.typed
    if typed.unit not in NOT_METRIC or typed.unit == entry.unit:
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


def _coherent(value: float, unit: str, target: str, digits: int) -> dict[str, str] | None:
    if target == unit or factor(unit, target) == 1 or digits <= 0:
        return None
    return {"result": in_unit(value, target, digits), "unit": target}
