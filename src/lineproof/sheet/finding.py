"""Parts that also record values found by a procedure, each closed by a criterion."""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field

from lineproof.errors import UserError
from lineproof.formula import Criterion, Formula, Notation, Symbol, symbol_from_id
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.quantity import unit_named
from lineproof.record import Entry, Procedure
from lineproof.record.entry import FOUND
from lineproof.record.procedures import run
from lineproof.record.sources import FoundSource
from lineproof.sheet.own_units import keep_to
from lineproof.sheet.shown import Shown


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


class Finding(Shown):
    """Parts that also record values found by a procedure."""

    notation: Notation

    def symbol(self, symbol: str, title: str) -> Symbol:
        """Return what the notation says of a symbol, else what its id says."""
        known = self.notation.get(symbol)
        return known if known is not None else symbol_from_id(symbol, title)

    def found(
        self,
        symbol: str,
        procedure: Procedure,
        closing: Criterion,
        *,
        unit: str,
        title: str = "",
        clause: str = "",
        basis: str = "",
        settings: Mapping[str, float] | None = None,
        **bound: Entry,
    ) -> Entry:
        """Record a value found by a procedure, with the criterion that closes it.

        The closing criterion may name the found symbol, the procedure's arguments and whatever
        else is in scope; if it does not hold the value is refused.
        """
        names = procedure.names
        inner = {n: e for n, e in bound.items() if n in names}
        args = dict(zip(names, self._arguments(names, inner), strict=True))
        wanted = Wanted(symbol, closing, unit, args, settings or {}, title, clause, basis, bound)
        return self.found_set(procedure, [wanted])[symbol]

    def found_set(self, procedure: Procedure, wanted: Iterable[Wanted]) -> dict[str, Entry]:
        """Record values that a procedure finds together; return them by symbol.

        Each is closed by its own criterion, which may name any of the others: the moments at the
        supports of a beam close one another. Raises :class:`UserError` if one does not close;
        then none is recorded.
        """
        values = list(wanted)
        found: dict[str, Entry] = {}
        try:
            for value in values:
                found[value.symbol] = self._found(procedure, value)
            for value in values:
                self._close(found[value.symbol], value.closing, {**value.bound, **found})
        except UserError:
            self.take_back(found)
            raise
        return found

    def _found(self, procedure: Procedure, wanted: Wanted) -> Entry:
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
        keep_to(self.notation, symbol, unit)
        source = FoundSource(
            self.symbol(symbol, wanted.title), procedure, tuple(wanted.args), settings, unit,
            wanted.closing, wanted.title, wanted.clause, wanted.basis,
        )  # fmt: skip
        args = tuple(wanted.args.values())
        return self._record(Entry(self._open_part(), symbol, FOUND, source, args, value))

    def _close(self, entry: Entry, closing: Criterion, bound: Mapping[str, Entry]) -> None:
        """Give a found value its closing criterion; refuse the value if it does not hold."""
        symbol = entry.symbol
        if symbol not in closing.names:
            raise UserError(f"{symbol}: its closing criterion {closing.text!r} does not name it")
        known = {n: e for n, e in bound.items() if n in closing.names}
        args = self._arguments(closing.names, known)
        sides = self._sides(closing, args)
        if not closing.holds(*sides):
            raise UserError(
                f"{symbol}: found {entry!r}, but its closing criterion {closing.text!r} fails"
            )
        entry.extra = {"closing_args": args, "closing_sides": sides}

    def _sides(self, test: Criterion, args: tuple[Entry, ...]) -> tuple[float, float]:
        values = [a.value for a in args]
        try:
            left, right = (side(*values) for side in test.functions)
        except NOT_COMPUTED as error:
            raise self._failed(test, args, error) from None
        if not all(isinstance(v, float) and v - v == 0.0 for v in (left, right)):
            raise self._failed(test, args, None)
        return left, right

    def _failed(
        self, source: Formula | Criterion, args: tuple[Entry, ...], error: Exception | None
    ) -> UserError:
        with_values = ", ".join(repr(a) for a in args)
        why = "division by zero" if isinstance(error, ZeroDivisionError) else "no real number"
        return UserError(f"{source.text!r} cannot be computed ({why}) with {with_values}")
