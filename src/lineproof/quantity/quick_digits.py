"""Rounding floats for print by the float's own formatting: what decimals would give, sooner.

Python writes a float correctly rounded, half to even; printed numbers are rounded half up. The two
differ only half way between two numbers: about there nothing is given and decimals have to decide.
"""

from __future__ import annotations

PLAIN_FROM, PLAIN_BELOW = -4, 6
"""Powers of ten between which numbers are written out."""
FEW_DIGITS = 3
"""Digits that stand at least before zeros that only hold the place."""
_HALF_WAY = "500"
"""Digits after the last one that may stand for half of its unit."""
_MOST = 17
_FORMATS = tuple(f"%.{decimals}e" for decimals in range(_MOST + len(_HALF_WAY)))


def quick_value(value: float, digits: int) -> float | None:
    """Return ``value`` rounded to ``digits`` significant digits, or None where decimals decide.

    >>> quick_value(12345.6, 3), quick_value(2.5, 1)
    (12300.0, None)
    """
    shown = _rounded(value, digits)
    return None if shown is None else float(shown) + 0.0  # no zero below zero


def quick_text(value: float, digits: int, power: int = 0) -> str | None:
    """Return ``value`` times ten to ``power``, printed to so many significant digits.

    None where decimals have to decide: half way between two numbers, and for a number that ends
    within its digits when it is scaled, since a short decimal keeps its own length then.

    >>> quick_text(12345.6, 3), quick_text(0.0123, 2, 3), quick_text(0.5, 3, 3)
    ('12300', '12', None)
    """
    shown = _rounded(value, digits)
    if shown is None or (power and float(shown) == value):
        return None
    mantissa, _, exponent = shown.partition("e")
    sign = "-" if mantissa[0] == "-" else ""
    figures = mantissa[len(sign)] + mantissa[len(sign) + 2 :]
    if figures[0] == "0":
        return "0"
    return sign + written(figures, int(exponent) + power)


def _rounded(value: float, digits: int) -> str | None:
    if value.__class__ is not float or not 0 < digits <= _MOST:
        return None
    longer = _FORMATS[digits + 2] % value
    after = digits + 2 if longer[0] == "-" else digits + 1
    # Short texts are those of infinity and of what is no number.
    if len(longer) <= after or longer[after : after + 3] == _HALF_WAY:
        return None
    return _FORMATS[digits - 1] % value


def written(figures: str, exponent: int) -> str:
    """Return figures whose first stands for ten to ``exponent`` as a printed number.

    >>> written("123", 4), written("551", 8), written("12", 4)
    ('12300', '551e6', '12e3')
    """
    rounded_away = exponent - len(figures) + 1
    few = rounded_away > 0 and len(figures) < FEW_DIGITS
    if PLAIN_FROM <= exponent < PLAIN_BELOW and not few:
        if rounded_away >= 0:
            return figures + "0" * rounded_away
        if exponent < 0:
            return "0." + "0" * (-exponent - 1) + figures
        return f"{figures[: exponent + 1]}.{figures[exponent + 1 :]}"
    power = exponent - exponent % 3
    if rounded_away > power:
        power = exponent  # 200e-18 would show digits that were rounded away
    whole = exponent - power + 1
    rest = f".{figures[whole:]}" if len(figures) > whole else ""
    return f"{figures[:whole]}{rest}e{power}"
