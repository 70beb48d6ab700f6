"""Utilisation of a check: demand over resistance, as a number and as it is printed."""

from __future__ import annotations

import math

from lineproof.quantity.digits import ALL_DIGITS, START_DIGITS, rounded_text
from lineproof.record.entry import Entry

_NOTHING = 0.001
"""Utilisation below which 0.00 is printed."""


def printed_ratio(utilisation: float, *, holds: bool) -> str:
    """Return a utilisation as it is printed: at most 1 where the check holds, above where not."""
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
