"""Values found by a procedure: run it, record what it found, close it by a criterion."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from lineproof.errors import UserError
from lineproof.formula import Criterion
from lineproof.quantity import unit_named
from lineproof.record import Entry, Procedure
from lineproof.record.entry import FOUND
from lineproof.record.procedures import run
from lineproof.record.sources import FoundSource
from lineproof.sheet.own_units import keep_to

if TYPE_CHECKING:
    from lineproof.sheet.sheet import Sheet

NOT_COMPUTED = (ArithmeticError, ValueError, TypeError)
"""What arithmetic without a real result raises; TypeError where a complex root is compared."""


@dataclass(frozen=True)
class Wanted:
    """A value to be found: what it rests on, by the procedure's names, and what closes it.

    ``bound`` are the entries that its closing criterion names besides, by those names.
    """

    symbol: str
    closing: Criterion
    unit: str
    args: Mapping[str, Entry]
    settings: Mapping[str, float] = field(default_factory=dict)
    title: str = ""
    clause: str = ""
    basis: str = ""
    bound: Mapping[str, Entry] = field(default_factory=dict)


def found_set(sheet: Sheet, procedure: Procedure, wanted: Iterable[Wanted]) -> dict[str, Entry]:
    """Record values that a procedure finds together; return them by symbol.

    Each is closed by its own criterion, which may name any of the others: the moments at the
    supports of a beam close one another. Raises :class:`UserError` if one does not close.
    """
    values = list(wanted)
    found: dict[str, Entry] = {}
    try:
        for value in values:
            found[value.symbol] = _found(sheet, procedure, value)
        for value in values:
            _close(sheet, found[value.symbol], value.closing, {**value.bound, **found})
    except UserError:
        sheet.take_back(found)
        raise
    return found


def _found(sheet: Sheet, procedure: Procedure, wanted: Wanted) -> Entry:
    symbol = wanted.symbol
    if not procedure.takes(wanted.args):
        raise UserError(f"{symbol}: procedure {procedure.name!r} takes other arguments")
    settings = dict(wanted.settings)
    try:
        value = run(procedure, {n: a.value for n, a in wanted.args.items()}, settings)
    except NOT_COMPUTED as error:
        raise UserError(f"{symbol}: procedure {procedure.name!r} failed ({error})") from None
    if not math.isfinite(value):
        raise UserError(f"{symbol}: procedure {procedure.name!r} found no finite number")
    unit = unit_named(wanted.unit).spelling
    keep_to(sheet.notation, symbol, unit)
    source = FoundSource(
        sheet.symbol(symbol, wanted.title), procedure, tuple(wanted.args), settings, unit,
        wanted.closing, wanted.title, wanted.clause, wanted.basis,
    )  # fmt: skip
    return sheet.take_in(symbol, FOUND, source, tuple(wanted.args.values()), value)


def _close(sheet: Sheet, entry: Entry, closing: Criterion, bound: Mapping[str, Entry]) -> None:
    """Give a found value its closing criterion; refuse the value if it does not hold."""
    symbol = entry.symbol
    if symbol not in closing.names:
        raise UserError(f"{symbol}: its closing criterion {closing.text!r} does not name it")
    args, sides = sheet.compared(closing, {n: e for n, e in bound.items() if n in closing.names})
    if not closing.holds(*sides):
        raise UserError(
            f"{symbol}: found {entry!r}, but its closing criterion {closing.text!r} fails"
        )
    entry.extra = {"closing_args": args, "closing_sides": sides}
