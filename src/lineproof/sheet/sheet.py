"""A calculation being made: parts, givens, lines, decisions, checks, look-ups, found values."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Mapping
from contextlib import contextmanager
from pathlib import Path
from typing import Any, ClassVar

from lineproof.errors import UserError
from lineproof.formula import Criterion, Formula, Notation, Symbol, System, symbol_from_id
from lineproof.formula.proof import prove, prove_criterion
from lineproof.quantity import QuantityInput, Typed, read_quantity
from lineproof.record import Entry, Part, Procedure, Record
from lineproof.record.build import build
from lineproof.record.entry import (
    CHECK,
    DECISION,
    FIGURE,
    FOUND,
    GIVEN,
    LINE,
    LOOKUP,
    NOTE,
    TABLE,
    VALUES,
)
from lineproof.record.procedures import run
from lineproof.record.sources import FoundSource, GivenSource, LookupSource, ShownSource
from lineproof.sheet.own import own_criterion, own_formula
from lineproof.sheet.project import read_project
from lineproof.sheet.tables import LookupTable

__all__ = ["PartView", "Sheet"]


class PartView:
    """One closed part of a sheet, as it is shown under a notebook cell."""

    def __init__(self, sheet: Sheet, key: str) -> None:
        self.sheet, self.key = sheet, key


class Sheet:
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
        self.calc = {"id": calc_id, "title": title}
        self.project: dict[str, Any] = dict(project or {})
        self.notation = notation or Notation(())
        self.codes: dict[str, str] = {}
        self.member = ""
        self.scope = ""
        self.not_covered: list[Mapping[str, str]] = []
        self.expected: dict[str, str] = {}
        self._parts: dict[str, Part] = {}
        self._stopped: dict[str, str] = {}
        self._part: Part | None = None
        self._scope_of_part: dict[str, Any] = {}

    @classmethod
    def open(cls, calc_id: str, *, project: str | Path, title: str = "") -> Sheet:
        """Start the calculation ``calc_id`` of the project whose facts stand in a TOML file."""
        return cls(calc_id, title, project=read_project(Path(project)))

    # -- parts -------------------------------------------------------------------------------

    @contextmanager
    def part(self, key: str, title: str) -> Iterator[Part]:
        """Open a part; an existing key is replaced in place. Parts do not nest."""
        if self._part is not None:
            msg = f"part {key!r} opened inside part {self._part.key!r}; close that one first"
            raise UserError(msg)
        _check_key(key)
        part = Part(key, title)
        before = self._parts.get(key)
        self._parts[key] = part
        self._part, self._scope_of_part = part, {}
        try:
            yield part
        except BaseException:
            self._stopped[key] = title
            raise
        finally:
            self._part = None
            if before is not None:
                before.replaced = True
        self._stopped.pop(key, None)
        if Sheet.shown is not None:
            Sheet.shown(PartView(self, key))

    @property
    def parts(self) -> tuple[Part, ...]:
        """The parts recorded so far, in order."""
        return tuple(self._parts.values())

    def entry(self, entry_id: str) -> Entry:
        """Return a recorded entry by its id ``part-key/symbol``."""
        key, _, symbol = entry_id.partition("/")
        part = self._parts.get(key)
        if part is None or symbol not in part.entries:
            raise UserError(f"{entry_id!r} is not recorded{self._run_first(key)}")
        return part.entries[symbol]

    def _run_first(self, key: str) -> str:
        call = self.expected.get(key)
        return f"; run {call} first" if call else ""

    def _open_part(self) -> Part:
        if self._part is None:
            raise UserError("nothing can be recorded outside a part; write 'with sheet.part(...):'")
        return self._part

    def _find(self, name: str) -> Entry:
        hits = [part.entries[name] for part in self._parts.values() if name in part.entries]
        values = [entry for entry in hits if entry.kind in VALUES]
        if len(values) == 1:
            return values[0]
        if values:
            places = ", ".join(entry.id for entry in values)
            raise UserError(
                f"{name} stands in {places}; say which: {name}=sheet.entry({values[0].id!r})"
            )
        waiting = [call for key, call in self.expected.items() if key not in self._parts]
        hint = f" (not run yet: {', '.join(waiting)})" if waiting else ""
        raise UserError(f"{name} is not recorded{hint}; give it first, or name it {name}=...")

    def _record(self, entry: Entry) -> Entry:
        part = self._open_part()
        if entry.symbol in part.entries:
            raise UserError(f"{entry.symbol} stands twice in part {part.key!r}; use another symbol")
        part.entries[entry.symbol] = entry
        if entry.kind in VALUES:
            self._scope_of_part[entry.symbol] = entry
        return entry

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
        data = self._symbol(symbol, title)
        read = typed
        if not isinstance(read, Typed):
            read = read_quantity(symbol, read, unit or data.unit or _typed_unit(symbol, typed))
        printed = unit or data.unit or read.unit
        made = GivenSource(data, read, printed, title or data.meaning, source, clause, basis)
        return self._record(Entry(self._open_part(), symbol, GIVEN, made, (), read.value))

    def lookup(
        self, symbol: str, table: LookupTable, row: str, column: str = "", *, title: str = ""
    ) -> Entry:
        """Record a value of a table, with row and source."""
        column = column or symbol
        number = table.row(row, symbol)[column]
        unit = table.columns[column]
        data = self._symbol(symbol, title)
        made = LookupSource(
            data, table.name, row, number, unit, title or data.meaning, table.source,
            table.clause, table.basis,
        )  # fmt: skip
        value = read_quantity(symbol, f"{number} {unit}", unit).value
        return self._record(Entry(self._open_part(), symbol, LOOKUP, made, (), value))

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
        if formula.__class__ is not Formula or bound:
            return self._general_line(formula, unit, title, system, symbol, bound)
        try:
            args, value = formula.step(self._scope_of_part)
        except KeyError:
            self._bring_in(formula.names)
            return self.line(formula, unit=unit, title=title, system=system, symbol=symbol)
        except (ArithmeticError, ValueError) as error:
            raise self._failed(formula, self._arguments(formula.names, {}), error) from None
        # A complex number or an integer has another class; inf - inf and nan - nan are not zero.
        if value.__class__ is not float or value - value != 0.0:
            raise self._failed(formula, args, None)
        part = self._part
        name = symbol or formula.symbol
        if part is None or name in part.entries:
            self._refuse_place(name)
        extra = {"title": title} if title else None
        made = Entry(part, name, LINE, formula, args, value, extra)  # type: ignore[arg-type]
        part.entries[name] = self._scope_of_part[name] = made  # type: ignore[union-attr]
        if unit:
            made.extra = {"title": title, "unit": unit}
        return made

    def _refuse_place(self, name: str) -> None:
        part = self._open_part()
        raise UserError(f"{name} stands twice in part {part.key!r}; use another symbol")

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
            formula = own_formula(formula, unit, title, system, self.notation)
            prove(formula, self._units(formula.names, bound))
            unit = None
        args = self._arguments(formula.names, bound)
        try:
            value = formula.function(*[a.value for a in args])
        except (ArithmeticError, ValueError) as error:
            raise self._failed(formula, args, error) from None
        if not isinstance(value, float) or value - value != 0.0:
            raise self._failed(formula, args, None)
        extra = {k: v for k, v in (("title", title), ("unit", unit)) if v} or None
        name = symbol or formula.symbol
        return self._record(Entry(self._open_part(), name, LINE, formula, args, value, extra))

    def _bring_in(self, names: Iterable[str]) -> None:
        for name in names:
            if name not in self._scope_of_part:
                self._scope_of_part[name] = self._find(name)

    def _arguments(self, names: Iterable[str], bound: Mapping[str, Entry]) -> tuple[Entry, ...]:
        self._open_part()
        unknown = [name for name in bound if name not in tuple(names)]
        if unknown:
            raise UserError(f"{unknown[0]} is not a name of the formula; it has {', '.join(names)}")
        args = []
        for name in names:
            entry = bound.get(name, self._scope_of_part.get(name))
            if entry is None:
                entry = self._find(name)
            if not isinstance(entry, Entry) or entry.kind not in VALUES:
                raise UserError(f"{name}: {entry!r} is not a recorded value")
            args.append(entry)
        return tuple(args)

    def _units(self, names: Iterable[str], bound: Mapping[str, Entry]) -> dict[str, str]:
        names = tuple(names)
        return {n: a.unit for n, a in zip(names, self._arguments(names, bound), strict=True)}

    def _failed(
        self, source: Formula | Criterion, args: tuple[Entry, ...], error: Exception | None
    ) -> UserError:
        with_values = ", ".join(repr(a) for a in args)
        why = "division by zero" if isinstance(error, ZeroDivisionError) else "no real number"
        return UserError(f"{source.text!r} cannot be computed ({why}) with {with_values}")

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
        **bound: Entry,
    ) -> Entry:
        """Record a check with its utilisation.

        A failing check that the engineer accepts carries the reason and his initials, and prints
        as such.
        """
        if bool(accepted) != bool(initials):
            raise UserError("an accepted exception needs both: accepted='reason', initials='A.B.'")
        exception = {"reason": accepted, "initials": initials} if accepted else None
        extra = {"exception": exception} if exception else {}
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
            test = own_criterion(test, unit, title, self.notation, self._units)
            prove_criterion(test, self._units(test.names, bound))
        args = self._arguments(test.names, bound)
        sides = self._sides(test, args)
        if title:
            extra = extra | {"title": title}
        return self._record(
            Entry(self._open_part(), key or test.key, kind, test, args, sides, extra)
        )

    def _sides(self, test: Criterion, args: tuple[Entry, ...]) -> tuple[float, float]:
        values = [a.value for a in args]
        try:
            left, right = (side(*values) for side in test.functions)
        except (ArithmeticError, ValueError) as error:
            raise self._failed(test, args, error) from None
        if not all(isinstance(v, float) and v - v == 0.0 for v in (left, right)):
            raise self._failed(test, args, None)
        return left, right

    # -- found values, figures, notes --------------------------------------------------------

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
        inner = {n: e for n, e in bound.items() if n in procedure.names}
        args = self._arguments(procedure.names, inner)
        settings = dict(settings or {})
        named = {n: a.value for n, a in zip(procedure.names, args, strict=True)}
        value = run(procedure, named, settings)
        source = FoundSource(
            self._symbol(symbol, title), procedure, settings, unit, closing, title, clause, basis
        )
        entry = Entry(self._open_part(), symbol, FOUND, source, args, value)
        outer = {n: e for n, e in (bound | {symbol: entry}).items() if n in closing.names}
        closing_args = self._arguments(closing.names, outer)
        sides = self._sides(closing, closing_args)
        if not closing.holds(*sides):
            raise UserError(
                f"{symbol}: found {entry!r}, but its closing criterion {closing.text!r} fails"
            )
        entry.extra = {"closing_args": closing_args, "closing_sides": sides}
        return self._record(entry)

    def figure(
        self,
        key: str,
        drawing: Mapping[str, Any],
        *,
        title: str,
        alt: str,
        rests_on: Iterable[Entry] = (),
    ) -> Entry:
        """Record a figure (plain shapes as JSON data) with its caption and alternative text."""
        content = {"figure": dict(drawing), "alt": alt, "caption": title}
        return self._show(FIGURE, key, ShownSource(title, alt, content), rests_on)

    def table(
        self,
        key: str,
        columns: list[str],
        rows: list[list[str]],
        *,
        title: str,
        rests_on: Iterable[Entry] = (),
    ) -> Entry:
        """Record a table of printed texts."""
        return self._show(
            TABLE, key, ShownSource(title, title, {"columns": columns, "rows": rows}), rests_on
        )

    def note(
        self, key: str, text: str, *, title: str = "", clause: str = "", basis: str = ""
    ) -> Entry:
        """Record a plain sentence."""
        return self._show(NOTE, key, ShownSource(title, text, {"text": text}, clause, basis), ())

    def _show(self, kind: str, key: str, source: ShownSource, rests_on: Iterable[Entry]) -> Entry:
        _check_key(key)
        return self._record(Entry(self._open_part(), key, kind, source, tuple(rests_on), None))

    def _symbol(self, symbol: str, title: str) -> Symbol:
        known = self.notation.get(symbol)
        return known if known is not None else symbol_from_id(symbol, title)

    # -- closing -----------------------------------------------------------------------------

    def close(self) -> Record:
        """Fix the printed strings and return the record.

        Refuses with every reason at once: a part not run, a part that stopped with an error, or
        something that rests on a replaced entry.
        """
        faults = [
            f"part {key!r} ({title}) stopped with an error; run it again"
            for key, title in self._stopped.items()
        ]
        faults += [
            f"part {key!r} has not been run; run {call}"
            for key, call in self.expected.items()
            if key not in self._parts
        ]
        faults += self._out_of_date()
        if faults:
            raise UserError(f"{self.calc['id']}: {fault}" for fault in faults)
        return Record(self.view(self._parts.values()))

    def view(self, parts: Iterable[Part]) -> dict[str, Any]:
        """Return the record data of some parts, without the checks of :meth:`close`."""
        return build(
            parts, calc=self.calc, member=self.member, project=self.project, codes=self.codes,
            notation=self.notation, scope=self.scope, not_covered=self.not_covered,
        )  # fmt: skip

    def _out_of_date(self) -> list[str]:
        stale: dict[str, list[str]] = {}
        for part in self._parts.values():
            for entry in part.entries.values():
                for arg in entry.args:
                    if self._is_replaced(arg):
                        stale.setdefault(part.key, []).append(arg.id)
        return [
            f"part {key!r} rests on {', '.join(dict.fromkeys(ids))}, which has changed since; "
            f"run {self.expected.get(key, 'it')} again"
            for key, ids in stale.items()
        ]

    def _is_replaced(self, arg: Entry) -> bool:
        part = self._parts.get(arg.part.key)
        current = part.entries.get(arg.symbol) if part is not None else None
        # Run again with nothing changed, an entry has the same digest: nothing is out of date.
        return current is not arg and (current is None or current.digest != arg.digest)


def _typed_unit(symbol: str, typed: object) -> str:
    """Take the unit from the text itself, for a symbol that no notation knows."""
    from lineproof.quantity.units import UNITS, plain_spelling  # noqa: PLC0415 - border only

    if isinstance(typed, str):
        tail = plain_spelling(typed.strip().lstrip("+-0123456789.eE"))
        if tail in UNITS:
            return tail
    if isinstance(typed, str | int | float):
        return ""
    raise UserError(f"{symbol}: name the unit to print it in: unit='mm'")


def _check_key(key: str) -> None:
    plain = key.replace("-", "").replace("_", "")
    if not (plain.isascii() and plain.isalnum() and len(key) <= 60 and key[0].isalnum()):  # noqa: PLR2004
        raise UserError(f"key {key[:60]!r}: use letters, digits and hyphens, such as 'flexure-2'")
