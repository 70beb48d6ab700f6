"""Numbers, units and symbols as nodes: from the record's ASCII texts to what is printed."""

from __future__ import annotations

import re
from collections.abc import Mapping
from functools import lru_cache

from lineproof.formula.notation import Notation, Symbol, symbol_from_id
from lineproof.quantity.digits import MINUS, with_minus
from lineproof.typeset.nodes import (
    MULTIPLY,
    NEGATE,
    Digits,
    Letter,
    Math,
    Prime,
    Scripts,
    Unit,
    Word,
    row,
)

NARROW_SPACE = "\u202f"
_GROUP_FROM = 5
_NUMBER = re.compile(r"([+-]?)(\d+(?:\.\d*)?|\.\d+)(?:[eE]([+-]?\d+))?\Z")
_RAISED = str.maketrans("0123456789-", "⁰¹²³⁴⁵⁶⁷⁸⁹⁻")
_FACTOR = re.compile(r"([A-Za-z%]+)\^?(-?\d+(?:\.5)?)?\Z")
_PRIMES = frozenset("′'’")


def grouped(digits: str, space: str = NARROW_SPACE) -> str:
    """Set thin spaces between thousands, from five digits before the point.

    >>> grouped("7600"), grouped("200000.5", " ")
    ('7600', '200 000.5')
    """
    whole, point, rest = digits.partition(".")
    if len(whole) >= _GROUP_FROM:
        head = len(whole) % 3
        groups = [whole[:head]] * bool(head) + [
            whole[i : i + 3] for i in range(head, len(whole), 3)
        ]
        whole = space.join(groups)
    return whole + point + rest


def is_number(text: str) -> bool:
    """Tell whether a text is a number of the record (``-12.5``, ``5.00e9``)."""
    return _NUMBER.match(text) is not None


def split_number(text: str) -> tuple[str, str, str] | None:
    """Return sign, digits and power of ten of a number text, or None for other text."""
    found = _NUMBER.match(text)
    if found is None:
        return None
    sign, digits, power = found.groups()
    return ("-" if sign == "-" else ""), digits, str(int(power)) if power else ""


@lru_cache(maxsize=16384)
def number_math(text: str) -> Math:
    """Return a number text as nodes: true minus, ``5.00e9`` as 5.00 × 10⁹."""
    parts = split_number(text)
    if parts is None:
        return Word(text)
    sign, digits, power = parts
    nodes: list[Math] = [NEGATE] if sign else []
    nodes.append(Digits(digits))
    if power:
        nodes += [MULTIPLY, Scripts(Digits("10"), None, _integer(power))]
    return row(nodes)


def _integer(text: str) -> Math:
    return row([NEGATE, Digits(text[1:])]) if text.startswith("-") else Digits(text)


def number_text(text: str) -> str:
    r"""Return a number text as it is printed in running text and tables.

    >>> number_text("-12500"), number_text("5.00e9"), number_text("2-25M")
    ('−12\u202f500', '5.00 × 10⁹', '2-25M')
    """
    parts = split_number(text)
    if parts is None:
        return text
    sign, digits, power = parts
    mantissa = (MINUS if sign else "") + grouped(digits)
    return f"{mantissa} × 10{power.translate(_RAISED)}" if power else mantissa


@lru_cache(maxsize=256)
def unit_text(unit: str) -> str:
    """Return a unit as it is printed: dots raised, exponents as superscripts, roots as roots.

    >>> unit_text("kN.m"), unit_text("kN/m3"), unit_text("MPa^0.5"), unit_text("1/MPa")
    ('kN·m', 'kN/m³', '√MPa', '1/MPa')
    """
    if unit == "deg":
        return "°"
    return "/".join(
        "·".join(_factor_text(factor) for factor in re.split(r"[.*](?=[A-Za-z])", side))
        for side in unit.split("/")
    )


def _factor_text(factor: str) -> str:
    found = _FACTOR.match(factor)
    if found is None:
        return factor
    name, power = found[1], found[2] or ""
    if not power.endswith(".5"):
        return name + power.translate(_RAISED)
    whole = power[:-2]
    plain = {"0": "", "1": name}.get(whole, name + whole.translate(_RAISED))
    return f"{plain}·√{name}" if plain else f"√{name}"


def value_math(text: str, unit: str) -> Math:
    """Return number and unit, the unit after a thin space (no space before a degree sign)."""
    number = number_math(text)
    return row([number, Unit(unit)]) if unit else number


def value_text(text: str, unit: str) -> str:
    r"""Return number and unit for running text.

    >>> value_text("551", "kN.m"), value_text("35", "deg")
    ('551\u202fkN·m', '35°')
    """
    space = "" if unit in ("", "deg") else NARROW_SPACE
    return number_text(text) + space + unit_text(unit)


def told(text: str, unit: str) -> str:
    """Return number and unit for a sentence that is also told in a terminal, digits as they stand.

    >>> told("12500", "kN.m"), told("35", "deg"), told("-4", "")
    ('12500 kN·m', '35°', '−4')
    """
    space = "" if unit in ("", "deg") else " "
    return with_minus(text) + space + unit_text(unit)


def symbol_of(symbol_id: str, notation: Notation) -> Symbol:
    """Return a symbol of the notation, or one made from its id."""
    found = notation.get(symbol_id)
    return found if found is not None else symbol_from_id(symbol_id)


@lru_cache(maxsize=4096)
def symbol_math(symbol: Symbol) -> Math:
    """Return a symbol as nodes: one letter italic, longer bases and all scripts upright."""
    base: Math = Letter(symbol.base) if _is_variable(symbol.base) else Word(symbol.base)
    if not symbol.sub and not symbol.sup:
        return base
    sup: Math | None = None
    if symbol.sup:
        primes = all(mark in _PRIMES for mark in symbol.sup)
        sup = row([Prime()] * len(symbol.sup)) if primes else Word(symbol.sup)
    return Scripts(base, Word(symbol.sub) if symbol.sub else None, sup)


def _is_variable(base: str) -> bool:
    return len(base) == 1 and (("a" <= base.lower() <= "z") or "α" <= base <= "ω")


def has_superscript(math: Math) -> bool:
    """Tell whether a power on this symbol would collide with its own superscript."""
    return isinstance(math, Scripts) and math.sup is not None


def empirical_note(numbers: Mapping[str, str]) -> str:
    """Return the units of an empirical formula's numbers.

    >>> empirical_note({"4500": "MPa^0.5"})
    '4500 in √MPa'
    """
    return "; ".join(
        f"{number_text(number)} in {unit_text(unit)}"
        if unit
        else f"{number_text(number)} (no unit)"
        for number, unit in numbers.items()
    )
