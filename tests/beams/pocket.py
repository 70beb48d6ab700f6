"""A checker with a pocket calculator: recomputes printed lines from what is printed alone.

It shares nothing with the package: Python's own parser, fractions, and the unit factors below.
"""

from __future__ import annotations

import ast
import math
import operator
from collections.abc import Callable, Iterator, Mapping
from decimal import ROUND_HALF_UP, Decimal
from fractions import Fraction
from typing import Any

Number = Fraction | float

_OPERATORS: dict[type, Callable[[Any, Any], Any]] = {
    ast.Add: operator.add, ast.Sub: operator.sub, ast.Mult: operator.mul,
    ast.Div: operator.truediv, ast.LtE: operator.le, ast.GtE: operator.ge, ast.Lt: operator.lt,
    ast.Gt: operator.gt,
}  # fmt: skip
_FUNCTIONS: dict[str, Callable[..., Number]] = {
    "sqrt": math.sqrt, "max": max, "min": min, "abs": abs,
    "cot": lambda angle: 1 / math.tan(math.radians(angle)),
}  # fmt: skip

# One printed unit in units of the system that the arguments are printed in.
FACTORS: dict[str, dict[str, Fraction]] = {
    "N-mm": {
        "": Fraction(1), "mm": Fraction(1), "mm2": Fraction(1), "mm3": Fraction(1),
        "mm4": Fraction(1),
        "MPa": Fraction(1), "N": Fraction(1), "N/mm": Fraction(1), "N.mm": Fraction(1),
        "m": Fraction(1000), "kN": Fraction(1000), "kN.m": Fraction(10**6), "kN/m": Fraction(1),
        "deg": Fraction(1), "mm2/mm": Fraction(1), "N.mm/mm": Fraction(1),
        "kN.m/m": Fraction(1000),
    },
    "kN-m": {
        "": Fraction(1), "m": Fraction(1), "kN": Fraction(1), "kN.m": Fraction(1),
        "kN/m": Fraction(1), "kPa": Fraction(1), "kN/m3": Fraction(1), "mm": Fraction(1, 1000),
        "kN.m2": Fraction(1), "m2": Fraction(1), "kN.m/m": Fraction(1),
    },
}  # fmt: skip


def calculate(text: str) -> float:
    """Evaluate a hand calculation written out in plain numbers in a test."""
    return float(evaluate(text, {}))


def evaluate(text: str, args: Mapping[str, str]) -> Number:
    """Return the value of an expression of printed numbers."""
    return _value(ast.parse(text.strip(), mode="eval").body, args)


def _value(node: ast.expr, args: Mapping[str, str]) -> Number:
    match node:
        case ast.Constant(value=float() | int() as constant):
            return Fraction(repr(constant))
        case ast.Name(id=name):
            return Fraction(args[name])
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            return -_value(operand, args)
        case ast.BinOp(left, ast.Pow(), right):
            base, power = _value(left, args), _value(right, args)
            whole = isinstance(power, Fraction) and power.denominator == 1
            return base ** int(power) if whole else float(base) ** float(power)
        case ast.BinOp(left, op, right):
            made: Number = _OPERATORS[type(op)](_value(left, args), _value(right, args))
            return made
        case ast.Call(func=ast.Name(id=name), args=values):
            return _FUNCTIONS[name](*[_value(value, args) for value in values])
    raise AssertionError(ast.dump(node))


def sides(text: str, args: Mapping[str, str]) -> tuple[Number, Number, bool]:
    """Return both sides of a comparison and its truth."""
    test = ast.parse(text.strip(), mode="eval").body
    assert isinstance(test, ast.Compare)
    left, right = _value(test.left, args), _value(test.comparators[0], args)
    return left, right, bool(_OPERATORS[type(test.ops[0])](left, right))


def last_digit(printed: str) -> float:
    """Return one unit of the last significant digit: 0.1 of 13.1, 1e8 of 16.6e9, 100 of 24700.

    Three digits are significant at least, so the zeros of a whole number count up to there.
    """
    mantissa, _, power = printed.lower().partition("e")
    digits = mantissa.lstrip("-")
    decimals = len(digits.partition(".")[2])
    unit = 10.0**-decimals
    if not decimals:
        zeros = len(digits) - len(digits.rstrip("0"))
        unit = 10.0 ** max(0, min(zeros, len(digits) - 3))
    return unit * 10.0 ** int(power or 0)


def _half_a_unit(printed: str) -> float:
    """Return how far a value may lie from its printed number that it rounds to."""
    return last_digit(printed) * (0.5 + 1e-9)


def faults(data: Mapping[str, Any]) -> Iterator[str]:
    """Give every printed line of a record that a calculator does not reproduce."""
    for part in data["parts"]:
        for entry in part["entries"]:
            if entry["kind"] == "line":
                yield from _line(entry)
            elif entry["kind"] in ("check", "decision"):
                yield from _comparison(entry["id"], entry, entry["system"])
            elif entry["kind"] == "found":
                yield from _comparison(
                    entry["id"], entry["closing"], entry["closing"].get("system", "N-mm")
                )


def _line(entry: Mapping[str, Any]) -> Iterator[str]:
    printed = entry["printed"]
    found = evaluate(entry["formula"].partition("=")[2], printed["args"])
    results = [(printed["result"], printed["unit"])]
    if printed["coherent"]:
        results.append((printed["coherent"]["result"], printed["coherent"]["unit"]))
    for result, unit in results:
        value = float(found / FACTORS[entry["system"]][unit])
        if abs(value - float(result)) > _half_a_unit(result):
            line = f"{entry['id']}: {entry['formula']} with {printed['args']}"
            yield f"{line} gives {value}, not {result} {unit}"


def _comparison(place: str, test: Mapping[str, Any], system: str) -> Iterator[str]:
    printed = test["printed"]
    left, right, truth = sides(test["formula"], printed["args"])
    said = sides(_between(test["formula"], printed), {})[2]
    if truth != test["holds"] or said != test["holds"]:
        yield f"{place}: printed {printed} does not have the truth {test['holds']}"
    factor = FACTORS[system][test["unit"]]
    for value, key in ((left, "left"), (right, "right")):
        # A difference near zero keeps no digits: abs(...) may print 0 for 1e-9.
        room = _half_a_unit(printed[key])
        if (
            "abs(" not in test["formula"]
            and abs(float(value / factor) - float(printed[key])) > room
        ):
            yield f"{place}: {key} side gives {float(value / factor)}, not {printed[key]}"
    if test.get("utilisation") is not None:
        ratio = (float(printed["utilisation"]) <= 1) == test["holds"]
        if not ratio and float(printed["utilisation"]) != 1:
            yield f"{place}: utilisation {printed['utilisation']} against {test['holds']}"
        yield from _ratio(place, test)


def _ratio(place: str, test: Mapping[str, Any]) -> Iterator[str]:
    """Divide the printed sides: the printed ratio, rounded half up, comes out."""
    printed = test["printed"]
    demand, resistance = Decimal(printed["left"]), Decimal(printed["right"])
    if ">" in test["formula"]:
        demand, resistance = resistance, demand
    if resistance:
        shown = Decimal(printed["utilisation"])
        again = (demand / resistance).quantize(shown, rounding=ROUND_HALF_UP)
        if again != shown:
            yield f"{place}: {demand}/{resistance} is {again}, not {shown}"


def _between(formula: str, printed: Mapping[str, str]) -> str:
    sign = next(s for s in ("<=", ">=", "<", ">") if s in formula)
    return f"{printed['left']} {sign} {printed['right']}"
