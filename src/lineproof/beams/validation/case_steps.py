"""Recording one published case: what it gives, the prediction, and the published values."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from contextlib import contextmanager
from decimal import ROUND_UP, Context
from typing import Any

from lineproof.beams.steps import Steps
from lineproof.beams.validation.data import HALF_UNIT, Case, Published, cases, shown
from lineproof.beams.validation.notation import PUBLISHED
from lineproof.formula import Criterion, Formula, criterion
from lineproof.record import Entry, Procedure
from lineproof.sheet import LookupTable, Sheet

AGREES = "agrees-"
"""Begins the key of the check that a prediction agrees with a published value."""
_FOUR_DIGITS = Context(prec=4, rounding=ROUND_UP)


class CaseSteps(Steps):
    """Records lines of one case; every argument must stand in the case itself.

    The same symbols stand in many cases: a value is never taken from another one.
    """

    def __init__(self, sheet: Sheet, case: Case) -> None:
        super().__init__(sheet, {})
        self.case = case

    def entry(self, name: str) -> Entry:
        """Return what a symbol stands for in this case."""
        return self.place[name]

    def give(self, *symbols: str) -> None:
        """Record what the case gives: these symbols, or all."""
        for symbol in symbols or self.case.given:
            self.given(symbol, self.case.given[symbol])

    def given(self, symbol: str, typed: str, title: str = "", source: str = "") -> Entry:
        """Record one given."""
        made = self.sheet.given(symbol, typed, title, source=source)
        self.place[symbol] = made
        return made

    def lookup(
        self, symbol: str, table: LookupTable, row: str, column: str = "", *, title: str = ""
    ) -> Entry:
        """Record a value of a table of the catalogue."""
        made = self.sheet.lookup(symbol, table, row, column, title=title)
        self.place[symbol] = made
        return made

    def line(self, formula: Formula, symbol: str = "", **bound: Entry) -> Entry:
        """Record a formula of the catalogue."""
        self._refuse_missing(formula.names, bound)
        return super().line(formula, symbol, **bound)

    def own(self, text: str, title: str) -> Entry:
        """Record a line that stands in no standard; its unit is that of the notation."""
        symbol = text.partition("=")[0].strip()
        unit = self.sheet.notation[symbol].unit
        names = [name for name in self.place if name != symbol]
        bound: dict[str, Any] = self._named(text, names)
        made = self.sheet.line(text, unit=unit, title=title, **bound)
        self.place[symbol] = made
        return made

    def _named(self, text: str, names: list[str]) -> dict[str, Entry]:
        used = set(words_in(text.partition("=")[2]))
        return {name: self.place[name] for name in names if name in used}

    def find(
        self,
        symbol: str,
        made: Procedure,
        closing: Criterion,
        *,
        title: str = "",
        clause: str = "statics",
        settings: Mapping[str, float] | None = None,
    ) -> Entry:
        """Record a found value; its unit is that of the notation."""
        self._refuse_missing([n for n in closing.names if n != symbol], {})
        known = self.sheet.notation[symbol]
        return self.found(
            symbol, made, closing, unit=known.unit, title=title or known.meaning, clause=clause,
            settings=settings,
        )  # fmt: skip

    def compare(self, *symbols: str) -> None:
        """Record published values, and that the predictions agree with them: all, or some."""
        for symbol in symbols or self.case.published:
            self._compare(symbol, self.case.published[symbol])

    def _compare(self, symbol: str, published: Published) -> None:
        printed = f"{symbol}{PUBLISHED}"
        self.given(printed, published.printed, source=self.case.short)
        self.check(agreement(symbol, published, self.sheet.notation[symbol].unit))

    def _refuse_missing(
        self, names: tuple[str, ...] | list[str], bound: Mapping[str, Entry]
    ) -> None:
        missing = [name for name in names if name not in self.place and name not in bound]
        if missing:
            msg = f"{self.case.id}: {', '.join(missing)} not recorded in this case"
            raise KeyError(msg)


def words_in(text: str) -> list[str]:
    """Return the names and numbers in the text of a formula."""
    return "".join(c if c.isalnum() or c == "_" else " " for c in text).split()


def agreement(symbol: str, published: Published, unit: str) -> Criterion:
    """Return the check that a prediction lies within the tolerance of a published value."""
    share = _FOUR_DIGITS.plus(published.share)
    printed = f"{symbol}{PUBLISHED}"
    size = f"abs({printed})" if published.number.startswith("-") else printed
    near = HALF_UNIT
    if published.why != HALF_UNIT:
        number, _, typed = published.within.partition(" ")
        near = f"{shown(number, typed)}: {published.why}"
    return criterion(
        f"abs({symbol} - {printed}) <= {share:f}*{size}",
        unit=unit,
        title=f"Agreement with the published {published.shown} within {near}",
        yes="The prediction agrees with the published value.",
        no="The prediction does NOT agree with the published value.",
        key=f"{AGREES}{symbol.replace('_', '-')}",
        proof=True,
    )


Predict = Callable[[CaseSteps], None]
"""Records the prediction of a case from what it gives."""


@contextmanager
def recorded(sheet: Sheet, case: Case) -> Iterator[CaseSteps]:
    """Open the part of a case and say what it is compared with."""
    with sheet.part(case.key, f"{case.id}: {case.title}"):
        note = f" {case.note}" if case.note else ""
        sheet.note(
            "source", f"{case.source}; {case.basis}. Code: {case.code}.{note}", title="Source"
        )
        yield CaseSteps(sheet, case)


def record_cases(sheet: Sheet, predicted: Mapping[str, Predict]) -> None:
    """Record published cases, a part for each: what it gives, the prediction, the comparison."""
    for name, predict in predicted.items():
        with recorded(sheet, cases()[name]) as steps:
            steps.give()
            predict(steps)
            steps.compare()
