"""Unit proof: push pint units through a formula once, instead of at every use.

A formula is homogeneous as it stands, or empirical: then each of its constants that carries a
unit declares it (``numbers={"4500": "MPa^0.5"}``), and with these the proof must close as well.
The proof also refuses a constant whose unit is not of the N, mm, MPa system, since values enter
the compiled function as bare numbers.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from functools import cache
from typing import Any

from lineproof.errors import UserError
from lineproof.formula.formula import Criterion, Formula
from lineproof.formula.tree import Binary, Call, Name, Negative, Number, Tree
from lineproof.quantity.units import UNITS, registry

PintUnit = Any
"""A pint unit; pint's own types do not say that a power of a unit is a unit."""

_NUMBER_UNIT = re.compile(r"(?:(1/)?)([A-Za-z0-9./]*?)(?:\^(\d+(?:\.\d+)?))?\Z")
_SCALE = 1e-12


class UnitProofError(UserError):
    """The two sides of a formula do not have the same unit."""


def number_unit(text: str) -> PintUnit:
    """Return the pint unit of a constant: ``MPa``, ``1/MPa``, ``MPa^0.5``, ``kg/m3``."""
    match = _NUMBER_UNIT.match(text)
    if match is None or (match[2] and match[2] not in UNITS):
        raise UnitProofError(f"{text!r} is not the unit of a constant; write for example 'MPa^0.5'")
    unit: PintUnit = registry().Unit(UNITS[match[2]].expression)
    unit = unit ** float(match[3]) if match[3] else unit
    return unit**-1 if match[1] else unit


def prove(formula: Formula, units: Mapping[str, str]) -> None:
    """Prove that the formula gives its declared unit; ``units`` are those of its arguments.

    Raises :class:`UnitProofError` that names both units.
    """
    found = _Push(formula.text, units, formula.numbers).unit_of(formula.tree)
    _same(formula.text, found, _internal(formula.unit), f"the result's {formula.unit or 'number'}")


def prove_criterion(criterion: Criterion, units: Mapping[str, str]) -> None:
    """Prove that both sides of the criterion have its declared unit."""
    push = _Push(criterion.text, units, criterion.numbers)
    wanted = _internal(criterion.unit)
    for side in (criterion.left, criterion.right):
        # A bare 0 compares with anything.
        if side != Number("0"):
            _same(criterion.text, push.unit_of(side), wanted, criterion.unit or "a number")


@cache
def _internal(spelling: str) -> PintUnit:
    return registry().Unit(UNITS[UNITS[spelling].internal].expression)


def _show(unit: PintUnit) -> str:
    return f"{unit:~}".replace(" ", "") or "a bare number"


def _same(text: str, found: PintUnit, wanted: PintUnit, what: str) -> None:
    ureg = registry()
    if found.dimensionality != wanted.dimensionality:
        raise UnitProofError(f"formula {text!r}: gives {_show(found)}, which is not {what}")
    scale = float(ureg.Quantity(1, found).to_base_units().magnitude) / float(
        ureg.Quantity(1, wanted).to_base_units().magnitude
    )
    if abs(scale - 1) > _SCALE:
        raise UnitProofError(
            f"formula {text!r}: a constant's unit is not of the N, mm, MPa system "
            f"(off by the factor {scale:.6g})"
        )


class _Push:
    """Pushes units through one formula."""

    def __init__(self, text: str, units: Mapping[str, str], numbers: Mapping[str, str]) -> None:
        self.text, self.units, self.numbers = text, units, numbers
        self.one = _internal("")

    def unit_of(self, tree: Tree) -> PintUnit:
        match tree:
            case Number(text):
                return number_unit(self.numbers[text]) if text in self.numbers else self.one
            case Name(symbol):
                return _internal(self.units[symbol])
            case Negative(of):
                return self.unit_of(of)
            case Binary(op, left, right):
                return self._binary(op, left, right)
            case Call(function, args):
                return self._call(function, args)

    def _binary(self, op: str, left: Tree, right: Tree) -> PintUnit:
        if op == "**":
            return self.unit_of(left) ** self._exponent(right)
        first, second = self.unit_of(left), self.unit_of(right)
        if op == "*":
            return second if first is self.one else first * second
        if op == "/":
            return first / second
        # A bare 0 has any unit; most terms of a long sum have the very same.
        if right == Number("0") or second is first:
            return first
        _same(self.text, second, first, f"{_show(first)}, so the sum has no meaning")
        return first

    def _exponent(self, tree: Tree) -> float:
        match tree:
            case Number(text) if text not in self.numbers:
                return float(text)
            case Negative(of):
                return -self._exponent(of)
            case Binary("/", Number(above), Number(below)) if float(below):
                return float(above) / float(below)
        raise UnitProofError(f"formula {self.text!r}: an exponent must be a plain number")

    def _call(self, function: str, args: tuple[Tree, ...]) -> PintUnit:
        units = [self.unit_of(a) for a in args]
        roots: dict[str, Callable[[PintUnit], PintUnit]] = {
            "sqrt": lambda u: u**0.5,
            "cbrt": lambda u: u ** (1 / 3),
            "abs": lambda u: u,
        }
        if function in roots:
            return roots[function](units[0])
        if function in ("min", "max"):
            first = next(
                (u for a, u in zip(args, units, strict=True) if a != Number("0")), self.one
            )
            for arg, unit in zip(args, units, strict=True):
                if arg != Number("0") and unit is not first:
                    _same(self.text, unit, first, f"{_show(first)} like the other values")
            return first
        _same(self.text, units[0], _internal("deg"), "an angle")
        return self.one
