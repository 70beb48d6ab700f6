"""A calculation being made: parts, givens, lines, decisions, checks, look-ups, found values."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from pathlib import Path
from typing import Any, ClassVar

from lineproof.errors import UserError, inputs_named
from lineproof.formula import Criterion, Formula, Notation, System
from lineproof.formula import formula as read_formula
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.formula.notation import check_id
from lineproof.formula.proof import prove, prove_criterion
from lineproof.quantity import QuantityInput, Typed, read_quantity, unit_named
from lineproof.record import Entry, Part, Record
from lineproof.record.build import PartByPart, build, labels_of
from lineproof.record.entry import CHECK, DECISION, GIVEN, LINE, LOOKUP
from lineproof.record.sources import GivenSource, LookupSource
from lineproof.record.uncollected import uncollected
from lineproof.sheet.finding import Finding
from lineproof.sheet.order import behind, in_order, out_of_date
from lineproof.sheet.own import own_criterion
from lineproof.sheet.own_units import keep_to, typed_unit, unit_of_kind
from lineproof.sheet.parts import check_calc_id, check_key
from lineproof.sheet.project import read_project
from lineproof.sheet.tables import LookupTable

_NOTHING = (
    "nothing is recorded on this sheet; run the cell that opens it and starts the calculation"
)


class PartView:
    """One closed part of a sheet, as it is shown under a notebook cell."""

    def __init__(self, sheet: Sheet, key: str) -> None:
        self.sheet, self.key = sheet, key

    def record(self) -> tuple[dict[str, Any], dict[str, str]]:
        """Return the part and the symbols it uses as plain data, and the labels of all entries."""
        parts = {part.key: part for part in self.sheet.parts}
        numbers = {key: n for n, key in enumerate(parts, 1)}
        own = parts[self.key]
        data: dict[str, Any] = {}
        for part in [*(p for p in behind(own, parts) if p is not own), own]:
            data = self.sheet.printed.part(part, numbers[part.key], self.sheet.notation)
        return data, labels_of((part, numbers[key]) for key, part in parts.items())


class Sheet(Finding):
    """A calculation being made.

    Everything is recorded inside a part; opening an existing key again replaces that part in
    place, so cells may be run again in any order. ``close`` gives the record, or refuses and
    names the parts to run again.

    >>> sheet = Sheet("B1")
    >>> with sheet.part("curb", "Curb load"):
    ...     h = sheet.given("h_cb", "300 mm", "height of the curb")
    ...     b = sheet.given("b_cb", "150 mm", "width of the curb")
    ...     A = sheet.line("A_cb = b_cb*h_cb", unit="mm2", title="Area of the curb")
    >>> A
    curb/A_cb = 45000 mm2
    """

    typed: Mapping[str, object]
    """Inputs as typed in the call that started the calculation, by their names."""
    shown: ClassVar[Callable[[PartView], None] | None] = None
    """Called with every part that closes; the notebook room sets it to display the part."""

    def __init__(
        self,
        calc_id: str,
        title: str = "",
        *,
        project: Mapping[str, Any] | None = None,
        notation: Notation | None = None,
    ) -> None:
        super().__init__()
        check_calc_id(calc_id)
        self.calc = {"id": calc_id, "title": title}
        self.project: dict[str, Any] = dict(project or {})
        self.notation = notation or Notation(())
        self.printed = PartByPart()
        self.codes: dict[str, str] = {}
        self.member = ""
        self.scope = ""
        self.started_with = ""
        self.typed: Mapping[str, object] = {}
        self.not_covered: list[Mapping[str, str]] = []

    @classmethod
    @inputs_named
    def open(cls, calc_id: str, *, project: str | Path, title: str = "") -> Sheet:
        """Start the calculation ``calc_id`` of the project whose facts stand in a TOML file."""
        return cls(calc_id, title, project=read_project(Path(project)))

    def _show_part(self, key: str) -> None:
        if Sheet.shown is not None:
            Sheet.shown(PartView(self, key))

    # -- values ------------------------------------------------------------------------------

    def given(
        self,
        symbol: str,
        typed: QuantityInput | Typed,
        title: str = "",
        *,
        unit: str | None = None,
        source: str = "",
        clause: str = "",
        basis: str = "",
    ) -> Entry:
        """Record a value as typed; its unit must be of the kind of ``unit`` or of the notation."""
        data = self.symbol(symbol, title)
        if unit is not None:
            unit = unit_named(unit).spelling
            keep_to(self.notation, symbol, unit)
        elif symbol in self.notation:
            unit = data.unit
        read = typed
        if not isinstance(read, Typed):
            read = read_quantity(symbol, read, typed_unit(symbol, read) if unit is None else unit)
        printed = read.unit if unit is None else unit
        unit_of_kind(symbol, read.unit, printed)
        made = GivenSource(data, read, printed, title or data.meaning, source, clause, basis)
        return self._record(Entry(self._open_part(), symbol, GIVEN, made, (), read.value))

    def lookup(
        self, symbol: str, table: LookupTable, row: str, column: str = "", *, title: str = ""
    ) -> Entry:
        """Record a value of a table, with row and source."""
        column = column or symbol
        numbers = table.row(row, symbol)
        if column not in numbers:
            raise UserError(
                f"{symbol}: table {table.name!r} has no column {column!r}; "
                f"it has {', '.join(table.columns)}"
            )
        number, unit = numbers[column], unit_named(table.columns[column]).spelling
        keep_to(self.notation, symbol, unit)
        data = self.symbol(symbol, title)
        read = read_quantity(symbol, f"{number} {unit}", unit)
        made = LookupSource(
            data, table.name, row, read, unit, title or data.meaning, table.source,
            table.clause_of(column), table.basis,
        )  # fmt: skip
        return self._record(Entry(self._open_part(), symbol, LOOKUP, made, (), read.value))

    def line(
        self,
        formula: Formula | str,
        *,
        unit: str | None = None,
        title: str = "",
        system: System = "N-mm",
        symbol: str = "",
        **bound: Entry,
    ) -> Entry:
        """Record a formula's value from the entries its names stand for.

        Names are found in the part, then outside if unique, else by keyword
        (``b=beam.b_f``). A formula given as text has its units proved at once.
        """
        if formula.__class__ is not Formula or bound or unit is not None or symbol:
            return self._general_line(formula, unit, title, system, symbol, bound)
        try:
            args, value = formula.step(self._scope_of_part)
        except KeyError:
            self._bring_in(formula.names)
            return self.line(formula, title=title)
        except NOT_COMPUTED as error:
            raise self._failed(formula, self._arguments(formula.names, {}), error) from None
        # A complex number or an integer has another class; inf - inf and nan - nan are not zero.
        if value.__class__ is not float or value - value != 0.0:
            raise self._failed(formula, args, None)
        part, name = self._part, formula.symbol
        if part is None or name in part.entries:
            self._refuse_place(name)
        extra = {"title": title} if title else None
        made = Entry(part, name, LINE, formula, args, value, extra)
        part.entries[name] = self._scope_of_part[name] = made
        return made

    def _general_line(
        self,
        formula: Formula | str,
        unit: str | None,
        title: str,
        system: System,
        symbol: str,
        bound: Mapping[str, Entry],
    ) -> Entry:
        if isinstance(formula, str):
            formula = read_formula(
                formula, unit=unit, title=title, system=system, notation=self.notation
            )
            prove(formula, self._units(formula.names, bound))
            unit = None
        if unit is not None:
            unit = unit_of_kind(symbol or formula.symbol, unit, formula.unit)
        args = self._arguments(formula.names, bound)
        try:
            value = formula.function(*[a.value for a in args])
        except NOT_COMPUTED as error:
            raise self._failed(formula, args, error) from None
        if not isinstance(value, float) or value - value != 0.0:
            raise self._failed(formula, args, None)
        extra = ({"title": title} if title else {}) | ({} if unit is None else {"unit": unit})
        name = check_id(symbol or formula.symbol)
        keep_to(self.notation, name, unit or formula.unit)
        return self._record(
            Entry(self._open_part(), name, LINE, formula, args, value, extra or None)
        )

    # -- comparisons -------------------------------------------------------------------------

    def decide(
        self,
        test: Criterion | str,
        *,
        key: str = "",
        title: str = "",
        unit: str | None = None,
        **bound: Entry,
    ) -> Entry:
        """Record which branch is taken, and why; the result has a truth for ``if``."""
        return self._compare(DECISION, test, key, title, unit, {}, bound)

    def check(
        self,
        test: Criterion | str,
        *,
        key: str = "",
        title: str = "",
        unit: str | None = None,
        accepted: str = "",
        initials: str = "",
        leads: bool = False,
        **bound: Entry,
    ) -> Entry:
        """Record a check with its utilisation.

        A failing check that the engineer accepts carries the reason and his initials, and prints
        as such. One that ``leads`` stands first where failing checks are listed.
        """
        if bool(accepted) != bool(initials):
            raise UserError("an accepted exception needs both: accepted='reason', initials='A.B.'")
        exception = {"reason": accepted, "initials": initials} if accepted else None
        extra: dict[str, Any] = {"exception": exception} if exception else {}
        extra |= {"leads": True} if leads else {}
        return self._compare(CHECK, test, key, title, unit, extra, bound)

    def _compare(
        self,
        kind: str,
        test: Criterion | str,
        key: str,
        title: str,
        unit: str | None,
        extra: dict[str, Any],
        bound: Mapping[str, Entry],
    ) -> Entry:
        if isinstance(test, str):
            test = own_criterion(
                test, unit, title, self.notation, lambda names: self._units(names, bound)
            )
            prove_criterion(test, self._units(test.names, bound))
        args = self._arguments(test.names, bound)
        sides = self._sides(test, args)
        if title:
            extra = extra | {"title": title}
        key = key or test.key
        check_key(key)
        return self._record(Entry(self._open_part(), key, kind, test, args, sides, extra))

    # -- closing -----------------------------------------------------------------------------

    def close(self) -> Record:
        """Fix the printed strings and return the record.

        Refuses with every reason at once: nothing recorded, a part not run, a part that stopped
        with an error, or something that rests on a replaced entry.
        """
        faults = [] if self._parts or self.expected else [_NOTHING]
        faults += [
            f"part {key!r} ({title}) stopped with an error; run it again"
            for key, title in self._stopped.items()
        ]
        faults += [
            f"{call} stopped with an error; run {call} again" for call in self._stopped_calls
        ]
        faults += [
            f"part {key!r} has not been run; run {call}"
            for key, call in self.expected.items()
            if key not in self._parts
        ]
        faults += out_of_date(self._parts, self.expected)
        if faults:
            raise UserError(f"{self.calc['id']}: {fault}" for fault in faults)
        with uncollected():
            # Read as any other record: what could not be read back is refused here.
            return Record.from_plain(self.view(in_order(self._parts)))

    def view(self, parts: Iterable[Part]) -> dict[str, Any]:
        """Return the record data of some parts, without the checks of :meth:`close`."""
        return build(
            parts, calc=self.calc, member=self.member, project=self.project, codes=self.codes,
            notation=self.notation, scope=self.scope, not_covered=self.not_covered,
        )  # fmt: skip
