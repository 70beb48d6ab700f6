"""Printed strings of entries, fixed when the record closes."""

from __future__ import annotations

from collections.abc import Sequence
from decimal import Decimal
from typing import Any

from lineproof.formula import Criterion, Formula, Name, System, Tree
from lineproof.formula.compiled import compile_tree
from lineproof.quantity.digits import (
    MOST_DIGITS,
    START_DIGITS,
    Argument,
    choose_digits,
    digits_in,
    number_text,
    rounded_text,
    significant,
    start_digits,
)
from lineproof.quantity.units import UNITS, factor, internal_factor, system_unit
from lineproof.record.entry import FOUND, GIVEN, LOOKUP, Entry

_NOT_METRIC = frozenset(
    {"in", "ft", "in2", "ft2", "in3", "ft3", "in4", "lbf", "kip", "lbf.ft", "kip.in", "kip.ft",
     "plf", "klf", "psi", "ksi", "psf", "ksf", "pcf", "lb/ft3", "lb", "lb/ft", "min"}
)  # fmt: skip
_LONGEST_COMPARISON = 15


def exact_decimal(entry: Entry) -> Decimal | None:
    """Return the exact decimal of a typed or looked-up value [internal unit], if it is short."""
    if entry.kind == GIVEN:
        exact = entry.source.typed.exact
    elif entry.kind == LOOKUP:
        unit = entry.source.unit
        exact = Decimal(entry.source.number) * factor(unit, UNITS[unit].internal)
    else:
        return None
    short = exact.normalize()
    return short if len(short.as_tuple().digits) <= MOST_DIGITS else None


def in_unit(value: float, unit: str, digits: int) -> str:
    """Return an internal value printed in a unit to so many significant digits."""
    return rounded_text(value / internal_factor(unit), digits)


class Printer:
    """Prints entries one after the other, remembering the digits each shows at its own line."""

    def __init__(self) -> None:
        self._digits: dict[int, int] = {}

    def printed(self, entry: Entry) -> dict[str, Any]:
        """Return the printed strings of a given, lookup, line or found value."""
        if entry.kind == GIVEN:
            made = _given(entry)
        elif entry.kind == LOOKUP:
            made = {"result": entry.source.number, "unit": entry.source.unit}
        elif entry.kind == FOUND:
            made = self._found(entry)
        else:
            made = self._line(entry)
        self._digits[id(entry)] = digits_in(made["result"])
        return made

    def criterion(self, entry: Entry, utilisation: float | None) -> dict[str, Any]:
        """Return the printed strings of a decision or a check."""
        made = self.comparison(entry.source, entry.args, entry.value, bool(entry))
        if utilisation is not None:
            made["utilisation"] = _ratio(utilisation, holds=bool(entry))
        return made

    def comparison(
        self, test: Criterion, args: Sequence[Entry], sides: tuple[float, float], holds: bool
    ) -> dict[str, Any]:
        """Return both sides printed so that the printed comparison has the recorded truth."""
        arguments = [self._argument(a) for a in args]
        shown: dict[str, int] = {}
        digits = []
        for tree, value in zip((test.left, test.right), sides, strict=True):
            chosen = self._side(tree, test.names, args, arguments, value, test.unit)
            digits.append(chosen[0])
            for name, n in chosen[1].items():
                shown[name] = max(n, shown.get(name, 0))
        left, right = _truthful(test, sides, digits, holds=holds)
        texts = {
            name: _argument_text(arg, argument, shown.get(name, argument.digits), test.system)
            for name, arg, argument in zip(test.names, args, arguments, strict=True)
        }
        return {"args": texts, "left": left, "right": right, "unit": test.unit}

    def _side(
        self,
        tree: Tree,
        names: tuple[str, ...],
        args: Sequence[Entry],
        arguments: Sequence[Argument],
        value: float,
        unit: str,
    ) -> tuple[int, dict[str, int]]:
        if isinstance(tree, Name):
            entry = args[names.index(tree.id)]
            own = self._digits.get(id(entry), START_DIGITS)
            exact = exact_decimal(entry)
            return (len(exact.as_tuple().digits) if exact else own), {}
        scale = internal_factor(unit)
        compiled = compile_tree(tree, names)
        chosen = choose_digits(
            lambda *numbers: compiled(*numbers) / scale, arguments, value / scale, unit
        )
        return chosen.result, dict(zip(names, chosen.args, strict=True))

    def _argument(self, entry: Entry) -> Argument:
        exact = exact_decimal(entry)
        own = self._digits.get(id(entry), START_DIGITS)
        start = max(START_DIGITS, own, start_digits(entry.value, entry.unit))
        return Argument(
            entry.value, min(start, MOST_DIGITS), None if exact is None else float(exact)
        )

    def _line(self, entry: Entry) -> dict[str, Any]:
        made: Formula = entry.source
        unit = entry.unit
        scale = internal_factor(unit)
        arguments = [self._argument(a) for a in entry.args]
        chosen = choose_digits(
            lambda *numbers: made.function(*numbers) / scale, arguments, entry.value / scale, unit
        )
        texts = {
            name: _argument_text(arg, argument, digits, made.system)
            for name, arg, argument, digits in zip(
                made.names, entry.args, arguments, chosen.args, strict=True
            )
        }
        return {
            "args": texts,
            "result": in_unit(entry.value, unit, chosen.result),
            "unit": unit,
            "coherent": _coherent(entry.value, unit, made.system, chosen.result),
        }

    def _found(self, entry: Entry) -> dict[str, Any]:
        digits = max(4, start_digits(entry.value, entry.unit))
        texts = {
            name: _argument_text(arg, argument, argument.digits, "N-mm")
            for name, arg in zip(entry.source.procedure.names, entry.args, strict=True)
            for argument in [self._argument(arg)]
        }
        return {
            "args": texts,
            "result": in_unit(entry.value, entry.unit, digits),
            "unit": entry.unit,
        }


def _given(entry: Entry) -> dict[str, Any]:
    typed = entry.source.typed
    if typed.unit not in _NOT_METRIC:
        number = typed.number.lstrip("+")
        return {"result": "0" + number if number.startswith(".") else number, "unit": typed.unit}
    digits = START_DIGITS
    exact = exact_decimal(entry)
    if exact is not None:
        digits = max(digits, len(exact.as_tuple().digits))
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
        return number_text((exact * shift).normalize())
    rounded = significant(argument.value, digits) * shift
    return rounded_text(rounded, digits)


def _coherent(value: float, unit: str, system: System, digits: int) -> dict[str, str] | None:
    target = system_unit(unit, system)
    if target == unit or factor(unit, target) == 1:
        return None
    return {"result": in_unit(value, target, digits), "unit": target}


def _truthful(
    test: Criterion, sides: tuple[float, float], digits: list[int], *, holds: bool
) -> tuple[str, str]:
    while True:
        left, right = (in_unit(value, test.unit, n) for value, n in zip(sides, digits, strict=True))
        if test.holds(float(left), float(right)) == holds or min(digits) >= _LONGEST_COMPARISON:
            return left, right
        digits = [n + 1 for n in digits]


def _ratio(utilisation: float, *, holds: bool) -> str:
    for digits in range(START_DIGITS, _LONGEST_COMPARISON):
        text = rounded_text(utilisation, digits)
        if (float(text) <= 1) == holds:
            return text
    return repr(utilisation)


def utilisation(entry: Entry) -> float | None:
    """Return demand over resistance of a check, if both sides are positive."""
    left, right = entry.value
    if entry.source.sign in (">=", ">"):
        left, right = right, left
    return left / right if left >= 0 and right > 0 else None
