"""Columns of the stirrup schedule of a record, by the names that they have and once had."""

from __future__ import annotations

from collections.abc import Iterable

_FIRST, _LAST = ("First", "From"), ("Last", "To")
"""How the headings of the places of a zone's outer stirrups begin, in records now and earlier."""


def first_column(columns: Iterable[str]) -> str:
    """Return the column with the place of the first stirrup of a zone; "" where there is none."""
    return _beginning(columns, _FIRST)


def last_column(columns: Iterable[str]) -> str:
    """Return the column with the place of the last stirrup of a zone; "" where there is none."""
    return _beginning(columns, _LAST)


def _beginning(columns: Iterable[str], words: tuple[str, ...]) -> str:
    return next((name for name in columns if name.startswith(words)), "")
