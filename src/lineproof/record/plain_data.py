"""Plain JSON data: what may stand in a record at all, before anything is read out of it."""

from __future__ import annotations

import json
import math
import re
from collections.abc import Iterable, Mapping
from functools import lru_cache
from operator import itemgetter
from typing import Any, NoReturn

from lineproof.errors import UserError

DEEPEST = 60
LARGEST_INTEGER = 2**53
_MOST_KEPT = 8192
"""Printed numbers that are kept as looked at: the same ones stand in many lines."""
_NUMBER_TEXT = re.compile(r"-?(?:0|[1-9][0-9]{0,29})(?:\.[0-9]{1,40})?(?:e-?[0-9]{1,3})?\Z")


def json_text(data: Mapping[str, Any]) -> str:
    """Return plain data as JSON text, the same for the same data."""
    return json.dumps(data, ensure_ascii=False, allow_nan=False, separators=(",", ":"))


def check_plain(data: object) -> None:
    """Refuse what JSON text could not hold and give back: NaN, lone surrogates, deep nesting."""
    if not _all_plain(data):
        _check(data, 0)


def _all_plain(data: object) -> bool:
    """Tell whether all is plain, by the shortest way; :func:`_check` tells what is not.

    A record holds some hundred thousand values: a call for each would take half of the reading.
    """
    foreign: list[str] = []
    waiting: list[Any] = [[data]]
    depths = [-1]
    try:
        while waiting:
            items, depth = waiting.pop(), depths.pop() + 1
            if items.__class__ is dict:
                foreign.append("".join(items))
                items = items.values()
            before = len(waiting)
            if depth > DEEPEST + 1 or not _sorted_out(items, foreign, waiting):
                return False
            depths.extend([depth] * (len(waiting) - before))
        "".join(foreign).encode()
    except (TypeError, UnicodeEncodeError):  # a key that is no text, a lone surrogate
        return False
    return True


def _sorted_out(items: Iterable[Any], foreign: list[str], waiting: list[Any]) -> bool:
    """Tell whether items are plain; texts to look at and what holds more items are put aside."""
    for item in items:
        kind = item.__class__
        if kind is str:
            if not item.isascii():
                foreign.append(item)
        elif kind is dict or kind is list:
            waiting.append(item)
        elif kind is float:
            if item - item != 0.0:  # infinite, or no number at all
                return False
        elif not _is_plain(item):
            return False
    return True


def _check(value: object, depth: int) -> None:
    """Raise :class:`UserError` with the first thing that is not plain."""
    if depth > DEEPEST:
        raise UserError(f"record: nested more than {DEEPEST} deep")
    items: Iterable[object] = (value,)
    if isinstance(value, dict):
        for key in value:
            _check(key if isinstance(key, str) else object(), depth)
        items = value.values()
    elif isinstance(value, list):
        items = value
    for item in items:
        if isinstance(item, dict | list):
            _check(item, depth + 1)
        elif not _is_plain(item):
            refuse_value(item)


def refuse_value(value: object) -> NoReturn:
    """Raise :class:`UserError` about a value that may not stand in a record."""
    raise UserError(f"record: {shown(value)} is neither text nor a finite number")


def _is_plain(value: object) -> bool:
    if isinstance(value, str):
        return not any("\ud800" <= ch <= "\udfff" for ch in value) if not value.isascii() else True
    if isinstance(value, int):
        return abs(value) <= LARGEST_INTEGER
    return value is None or (isinstance(value, float) and math.isfinite(value))


def shown(value: object) -> str:
    """Return a short form of a value for an error."""
    if isinstance(value, int | float | str) and not isinstance(value, bool):
        big = isinstance(value, int) and abs(value) > LARGEST_INTEGER
        return "a very large integer" if big else ascii(value)[:60]
    return "nothing" if value is None else f"a {type(value).__name__}"


def is_number(value: object) -> bool:
    """Tell whether a value of plain data is a number."""
    return isinstance(value, int | float) and not isinstance(value, bool)


def is_number_text(value: object) -> bool:
    """Tell whether a value is a printed number.

    >>> is_number_text("-12.5"), is_number_text("5.00e9"), is_number_text("1 000")
    (True, True, False)
    """
    return isinstance(value, str) and _reads_as_number(value)


def are_number_texts(values: Iterable[object]) -> bool:
    """Tell whether all values are printed numbers."""
    try:
        return all(map(_reads_as_number, values))
    except TypeError:
        return False


@lru_cache(maxsize=_MOST_KEPT)
def _reads_as_number(text: str) -> bool:
    return _NUMBER_TEXT.match(text) is not None


def need(row: Mapping[str, Any], what: str, /, **kinds: type) -> None:
    """Refuse a row without the named fields of these kinds."""
    for name, kind in kinds.items():
        value = row.get(name)
        if not isinstance(value, kind) or (kind is not bool and isinstance(value, bool)):
            raise UserError(f"record: {what}: {name!r} is missing or not a {kind.__name__}")


class Fields:
    """Fields that a row must have, by name and kind; at least two.

    >>> Fields(id=str, lines=list).need({"id": "B7", "lines": []}, "part")
    """

    def __init__(self, **kinds: type) -> None:
        self._kinds = kinds
        self._values = itemgetter(*kinds)
        self._types = tuple(kinds.values())

    def need(self, row: Mapping[str, Any], what: str) -> None:
        """Refuse a row without these fields, as :func:`need` does."""
        try:
            if tuple(map(type, self._values(row))) == self._types:
                return
        except KeyError:
            pass
        need(row, what, **self._kinds)


def check_texts(values: object, what: str) -> None:
    """Refuse anything but a list of texts."""
    if not isinstance(values, list) or not all(isinstance(value, str) for value in values):
        raise UserError(f"record: {what} holds something else than a list of texts")
