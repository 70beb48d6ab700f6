"""Recording steps with the entries that a place of the beam stands for."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

from lineproof.formula import Criterion, Formula
from lineproof.record import Entry, Procedure
from lineproof.sheet import Sheet


def only(bound: Mapping[str, Entry], names: Iterable[str]) -> dict[str, Any]:
    """Return the bindings that are among the names, to be passed on by keyword."""
    return {name: bound[name] for name in names if name in bound}


class Steps:
    """Records lines at one place of a beam (midspan, an end).

    ``place`` holds what the symbols stand for there (``d``, ``A_s``, ``b``, ...), before what the
    sheet holds under them; what ``line`` and ``found`` record here, or ``bind`` names, replaces it.
    """

    def __init__(self, sheet: Sheet, place: Mapping[str, Entry]) -> None:
        self.sheet, self.place = sheet, dict(place)

    def bind(self, **entries: Entry) -> None:
        """Let symbols stand for these entries from here on."""
        self.place.update(entries)

    def entry(self, name: str) -> Entry:
        """Return what a symbol stands for here."""
        found = self.place.get(name)
        return self.sheet.find(name) if found is None else found

    def line(self, formula: Formula, symbol: str = "", **bound: Entry) -> Entry:
        """Record a formula; what it gives stands for its symbol from here on."""
        args = only(self.place | bound, formula.names)
        made = self.sheet.line(formula, symbol=symbol, **args)
        self.place[symbol or formula.symbol] = made
        return made

    def lines(self, *formulas: Formula) -> None:
        """Record several formulas one after the other."""
        for formula in formulas:
            self.line(formula)

    def decide(self, test: Criterion, **bound: Entry) -> Entry:
        """Record a decision."""
        return self.sheet.decide(test, **only(self.place | bound, test.names))

    def holds(self, test: Criterion) -> bool:
        """Tell whether a comparison would hold here, without recording it."""
        return test.holds(*test.sides({name: self.entry(name).value for name in test.names}))

    def check(
        self,
        test: Criterion,
        key: str = "",
        title: str = "",
        *,
        leads: bool = False,
        **bound: Entry,
    ) -> Entry:
        """Record a check, under a title of its own if one is given; ``leads`` as on the sheet."""
        args = only(self.place | bound, test.names)
        return self.sheet.check(test, key=key, title=title, leads=leads, **args)

    def found(
        self,
        symbol: str,
        procedure: Procedure,
        closing: Criterion,
        *,
        unit: str,
        title: str,
        clause: str,
        settings: Mapping[str, float] | None = None,
    ) -> Entry:
        """Record a found value with its closing criterion."""
        names = dict.fromkeys((*procedure.names, *closing.names))
        args = only(self.place, (name for name in names if name != symbol))
        made = self.sheet.found(
            symbol, procedure, closing, unit=unit, title=title, clause=clause,
            settings=settings, **args,
        )  # fmt: skip
        self.place[symbol] = made
        return made
