"""Slips of the pen: one digit changed, two neighbours swapped."""

from __future__ import annotations

import re
from collections.abc import Iterator
from itertools import pairwise

NUMBER = re.compile(r"-?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?")
_DIGITS = "0123456789"
MOST = 6
"""So many digits at the front of a number are looked at; further ones move it by less than 1e-5."""


def written(text: str) -> str:
    """Return the number that a typed value begins with: ``7.6`` of ``7.6 m``; none gives ``""``."""
    found = NUMBER.search(text)
    return found[0] if found else ""


def swapped(number: str) -> Iterator[str]:
    """Give a number with two neighbouring digits swapped, in every way that changes it.

    >>> list(swapped("3.84"))
    ['8.34', '3.48']
    """
    at = _places(number)
    for first, second in pairwise(at):
        a, b = number[first], number[second]
        if a != b:
            yield number[:first] + b + number[first + 1 : second] + a + number[second + 1 :]


def changed(number: str) -> Iterator[str]:
    """Give a number with one digit changed, in every way."""
    at = _places(number)
    if "." not in number:
        # Zeros behind the third digit hold the place; nobody mistypes them one by one.
        at = at[: max(len(number.rstrip("0").lstrip("-")), 3)]
    for place in at:
        for digit in _DIGITS:
            if digit != number[place]:
                yield number[:place] + digit + number[place + 1 :]


def _places(number: str) -> list[int]:
    mantissa = re.split("[eE]", number)[0]
    digits = [at for at, sign in enumerate(mantissa) if sign.isdigit()]
    first = next((k for k, at in enumerate(digits) if mantissa[at] != "0"), 0)
    if mantissa.lstrip("-")[:1] == "0" and mantissa.lstrip("-")[1:2].isdigit():
        first = 0  # 024 is itself a slip, most likely of 204
    return digits[first : first + MOST]
