"""Plain data out of JSON text: what the text cannot hold need not be looked for in the data."""

from __future__ import annotations

import json
import re
from typing import Any

from lineproof.errors import UserError
from lineproof.record.plain_data import DEEPEST, LARGEST_INTEGER, check_plain, refuse_value

_MARKS = b'[]{}"'
_TO_SQUARE = bytes.maketrans(b"{}", b"[]")
_NO_MARKS = bytes(set(range(256)) - set(_MARKS))
_QUOTED = re.compile(rb'"[^"]*"')


def read_plain(text: str) -> Any:
    """Return the data of JSON text, all of it plain; raises :class:`UserError`.

    Every number is looked at as it is read. Depth and lone surrogates are seen in the text, in a
    tenth of the time that a walk over the data takes; where the text leaves a doubt, the walk
    decides.
    """
    try:
        data = json.loads(
            text, parse_float=_finite, parse_int=_whole, parse_constant=_refuse_constant
        )
    except UserError:
        raise
    except (ValueError, RecursionError) as error:
        raise UserError(f"record: not readable as JSON ({str(error)[:80]})") from None
    if not is_surely_plain(text):
        check_plain(data)
    return data


def is_surely_plain(text: str) -> bool:
    r"""Tell whether valid JSON text shows that it nests no deeper than allowed, without surrogates.

    >>> is_surely_plain('{"a": ["[[", "\\""]}'), is_surely_plain("[" * 62 + "]" * 62)
    (True, False)
    """
    if "\\" in text:
        if "\\u" in text:
            return False
        # A quote after an even number of backslashes ends a string.
        text = text.replace("\\\\", "").replace('\\"', "")
    try:
        marks = text.encode().translate(_TO_SQUARE, _NO_MARKS)
    except UnicodeEncodeError:
        return False
    marks = _QUOTED.sub(b"", marks.replace(b'""', b""))
    for _ in range(DEEPEST + 1):
        marks = marks.replace(b"[]", b"")
    return not marks


def _finite(text: str) -> float:
    value = float(text)
    if value - value != 0.0:  # infinite
        refuse_value(value)
    return value


def _whole(text: str) -> int:
    value = int(text)
    if abs(value) > LARGEST_INTEGER:
        refuse_value(value)
    return value


def _refuse_constant(name: str) -> float:
    msg = f"{name} is not a number"
    raise ValueError(msg)
