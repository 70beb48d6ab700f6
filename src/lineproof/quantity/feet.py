"""Lengths as drawings in feet and inches show them: ``25'-6 1/2"``, ``3/4 in``."""

from __future__ import annotations

import re
from decimal import Decimal

PARTS_OF_AN_INCH = (2, 4, 8, 16, 32, 64)
"""What an inch is divided into on a rule; each gives an exact decimal."""
INCHES_IN_A_FOOT = 12
_LONGEST = 60

_FRACTIONS = {"¼": "1/4", "½": "1/2", "¾": "3/4", "⅛": "1/8", "⅜": "3/8", "⅝": "5/8", "⅞": "7/8"}
_MARKS = str.maketrans(
    {"’": "'", "′": "'", "”": '"', "″": '"', "⁄": "/"}
    | {sign: f" {text}" for sign, text in _FRACTIONS.items()}
)
_FOOT = r"(?:'(?!')|ft\b\.?|feet\b|foot\b)"
_INCH = r"(?:\"|''|in\b\.?|inch\b|inches\b)"
_FEET_AND_INCHES = re.compile(
    rf"(?P<sign>[+-]?) ?(?:(?P<feet>[0-9]{{1,9}}(?:\.[0-9]{{1,9}})?) ?{_FOOT})?"
    rf"(?:(?P<hyphen> ?-? ?)(?P<whole>[0-9]{{1,9}}(?:\.[0-9]{{1,9}})?)?"
    rf"(?:(?P<gap>[ -]*)(?P<above>[0-9]{{1,3}})/(?P<below>[0-9]{{1,3}}))? ?{_INCH})?\Z"
)


def one_unit(text: str) -> str:
    r"""Return a length in feet and inches as one number with one unit, exactly.

    Any other text, and a length that is not written as one, is returned as it is.

    >>> one_unit("25'-6 1/2\""), one_unit("25'-0\""), one_unit("3/4 in"), one_unit("7.6 m")
    ('306.5 in', '25 ft', '0.75 in', '7.6 m')
    """
    short = len(text) <= _LONGEST
    match = _FEET_AND_INCHES.match(" ".join(text.translate(_MARKS).split())) if short else None
    if match is None:
        return text
    feet, whole, above = match["feet"], match["whole"], match["above"]
    inches = _inches(match)
    if inches is None or (feet is None and (match["hyphen"] or whole is above is None)):
        return text
    if feet is not None and (whole is not None or above is not None):
        if "." in feet or inches >= INCHES_IN_A_FOOT:
            return text
        if inches:
            inches += int(feet) * INCHES_IN_A_FOOT
            return f"{match['sign']}{_plain(inches)} in"
    if feet is not None:
        return f"{match['sign']}{feet} ft"
    # A single number is kept as typed, zeros too: 1.50 in.
    return f"{match['sign']}{whole if above is None else _plain(inches)} in"


def _inches(match: re.Match[str]) -> Decimal | None:
    """Return the inches of a length; None where they are not written as on a rule."""
    whole, above, below = match["whole"], match["above"], match["below"]
    if above is None:
        return Decimal(whole or 0)
    apart = whole is None or bool(match["gap"])  # 61/2 is no 6 1/2
    mixed = whole is not None and ("." in whole or int(above) >= int(below))
    if not apart or mixed or int(below) not in PARTS_OF_AN_INCH:
        return None
    return Decimal(whole or 0) + Decimal(above) / Decimal(below)


def _plain(number: Decimal) -> str:
    text = f"{number:f}"
    return text.rstrip("0").rstrip(".") if "." in text else text


def feet_advice(text: str) -> str:
    """Say how a length in feet and inches is written; nothing where none is meant.

    Words need no marks of feet and inches, one of which ends a text of Python too early.

    >>> feet_advice("25'-13 in"), feet_advice("7 furlongs")
    ("'25 ft 6 1/2 in': inches below 12, in halves down to sixty-fourths", '')
    """
    plain = text[:_LONGEST].translate(_MARKS)
    if not re.search(rf"[0-9] ?(?:{_FOOT}|{_INCH})", plain):
        return ""
    return "'25 ft 6 1/2 in': inches below 12, in halves down to sixty-fourths"
