"""Live parts and entries into the plain data of a record."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from typing import Any

from lineproof.errors import UserError
from lineproof.formula import FROM_MEMORY, Notation, Symbol, symbol_from_id
from lineproof.quantity.units import UNITS, internal_factor
from lineproof.record.entry import (
    CHECK,
    CRITERIA,
    FIGURE,
    FOUND,
    GIVEN,
    LINE,
    LOOKUP,
    NOTE,
    TABLE,
    VALUES,
    Entry,
    Part,
    digest_of,
)
from lineproof.record.plain_data import check_plain
from lineproof.record.printing import Printer, utilisation
from lineproof.record.seal import SEAL, seal_of
from lineproof.sentences import begun

SCHEMA = 1
EARLIER_EDITION = "an earlier edition"
"""Stands in the basis of a rule whose text in the edition named is not known here."""
_UNNUMBERED = (FIGURE, NOTE, TABLE)


def build(
    parts: Iterable[Part],
    *,
    calc: Mapping[str, str],
    member: str,
    project: Mapping[str, Any],
    codes: Mapping[str, str],
    notation: Notation,
    scope: str,
    not_covered: Iterable[Mapping[str, str]],
) -> dict[str, Any]:
    """Return the record of a calculation as plain data, printed strings and digest included."""
    parts = list(parts)
    builder = _Builder(notation, _settled(parts))
    made = [builder.part(part, str(n)) for n, part in enumerate(parts, 1)]
    entries = [entry for part in made for entry in part["entries"]]
    confirm = _to_confirm(entries, project, codes)
    data = {
        "schema": SCHEMA,
        "calc": dict(calc),
        "kind_of_member": member,
        "project": dict(project),
        "codes": dict(codes),
        "notation": builder.notation(),
        "parts": made,
        "confirm": confirm,
        "status": {
            "scope": _scope(scope, confirm),
            "not_covered": [dict(item) for item in not_covered],
            "failed": [e["id"] for e in entries if e["kind"] == CHECK and not e["holds"]],
        },
        "digest": record_digest(calc["id"], codes, entries),
    }
    check_plain(data)
    return data | {SEAL: seal_of(data)}


def record_digest(
    calc_id: str, codes: Mapping[str, str], entries: Iterable[Mapping[str, Any]]
) -> str:
    """Hash the calculation; title, signatures and dates stay outside, so signing keeps it.

    The order in which the parts were run does not matter.
    """
    pieces = sorted(f"{e['id']}:{e['digest']}" for e in entries)
    return digest_of(calc_id, codes.get("pair", ""), *pieces)


def _scope(scope: str, confirm: list[dict[str, Any]]) -> str:
    if scope:
        return scope
    if any(not row["confirmed"] for row in confirm):
        return "preliminary: values from memory not yet confirmed"
    return ""


def labels_of(parts: Iterable[tuple[Part, int]]) -> dict[str, str]:
    """Return the printed label of every entry of numbered parts, by id, without printing them."""
    return {
        entry.id: label for part, number in parts for entry, label in _labelled(part, str(number))
    }


def _labelled(part: Part, label: str) -> Iterator[tuple[Entry, str]]:
    number = 0
    for entry in part.entries.values():
        # A note on a clause may have to be confirmed, so it can be named.
        numbered = entry.kind not in _UNNUMBERED or bool(entry.source.clause)
        number += numbered
        yield entry, f"{label}.{number}" if numbered else ""


class PartByPart:
    """Prints parts as they close, each once, for a notebook; remembers what each has shown.

    A value is printed with the digits that its own part and those before ask for.
    """

    def __init__(self) -> None:
        self._made: dict[int, tuple[Part, dict[str, Any]]] = {}
        self._digits: dict[int, int] = {}

    def part(self, part: Part, number: int, notation: Notation) -> dict[str, Any]:
        """Return a part and the symbols it uses as plain data: ``part`` and ``notation``."""
        known = self._made.get(id(part))
        if known is not None and known[1]["part"]["label"] == str(number):
            return known[1]
        printer = _settled([part], self._digits)
        builder = _Builder(notation, printer)
        made = builder.part(part, str(number))
        self._digits.update(printer.digits)
        data = {"part": made, "notation": builder.notation()}
        self._made[id(part)] = part, data  # with the part, so that its id stays its own
        return data


def _settled(parts: Sequence[Part], digits: Mapping[int, int] | None = None) -> Printer:
    """Return the strings of all entries, printed until no line asks for more digits of a value."""
    entries = [entry for part in parts for entry in part.entries.values()]
    for entry in entries:
        _check_kinds(entry)
    return Printer(entries, digits)


def _ratio_of(entry: Entry) -> float | None:
    return utilisation(entry) if entry.kind == CHECK else None


class _Builder:
    def __init__(self, notation: Notation, printer: Printer) -> None:
        self._known = notation
        self._used: dict[str, Symbol] = {}
        self._printer = printer

    def notation(self) -> list[dict[str, str]]:
        fields = ("id", "base", "sub", "sup", "meaning", "unit")
        used = sorted(self._used.values(), key=lambda s: (s.id.lower(), s.id))
        return [{f: getattr(symbol, f) for f in fields} for symbol in used]

    def part(self, part: Part, label: str) -> dict[str, Any]:
        rows = [self._entry(entry, own) for entry, own in _labelled(part, label)]
        return {"key": part.key, "label": label, "title": part.title, "entries": rows}

    def _entry(self, entry: Entry, label: str) -> dict[str, Any]:
        source = entry.source
        common = {
            "id": entry.id,
            "kind": entry.kind,
            "symbol": entry.symbol,
            "label": label,
            "title": _title_of(entry),
            "clause": source.clause,
            "basis": source.basis,
            "digest": entry.digest,
        }
        if entry.kind in VALUES:
            self._note_symbol(entry)
            value = entry.value / internal_factor(entry.unit)
            return common | {"value": value, "unit": entry.unit} | self._value(entry)
        if entry.kind in CRITERIA:
            return common | self._criterion(entry)
        rests = {"args": _shown_arguments(entry.args)} if entry.args else {}
        return common | rests | dict(source.content)

    def _value(self, entry: Entry) -> dict[str, Any]:
        source = entry.source
        printed = {"printed": self._printer.value(entry)}
        if entry.kind == GIVEN:
            return {"typed": source.typed.text, "source": source.origin} | printed
        if entry.kind == LOOKUP:
            return {"table": source.table, "row": source.row, "source": source.origin} | printed
        if entry.kind == FOUND:
            return self._found(entry) | printed
        return {
            "formula": source.text,
            "args": _arguments(source.names, entry.args),
            "numbers": dict(source.numbers),
            "system": source.system,
        } | printed

    def _found(self, entry: Entry) -> dict[str, Any]:
        source = entry.source
        made = source.procedure
        extra = entry.extra or {}
        closing_args: tuple[Entry, ...] = extra["closing_args"]
        sides: tuple[float, float] = extra["closing_sides"]
        test = source.closing
        holds = test.holds(*sides)
        return {
            "procedure": {"name": made.name, "version": made.version, "title": made.title},
            "settings": dict(source.settings),
            "args": _arguments(source.names, entry.args),
            "closing": {
                "formula": test.text,
                "args": _arguments(test.names, closing_args),
                "holds": holds,
                "left": sides[0] / internal_factor(test.unit),
                "right": sides[1] / internal_factor(test.unit),
                "unit": test.unit,
                "conclusion": test.yes,
                "printed": self._printer.comparison(entry),
            }
            | ({} if test.system == "N-mm" else {"system": test.system}),
        }

    def _criterion(self, entry: Entry) -> dict[str, Any]:
        test, extra = entry.source, entry.extra or {}
        holds = bool(entry)
        ratio = _ratio_of(entry)
        row: dict[str, Any] = {
            "formula": test.text,
            "args": _arguments(test.names, entry.args),
            "numbers": dict(test.numbers),
            "system": test.system,
            "holds": holds,
            "left": entry.value[0] / internal_factor(test.unit),
            "right": entry.value[1] / internal_factor(test.unit),
            "unit": test.unit,
            "printed": self._printer.criterion(entry, ratio),
            "conclusion": test.yes if holds else test.no,
        }
        if entry.kind == CHECK:
            row["utilisation"] = ratio
            if test.proof:
                row["proof"] = True
            if not holds and extra.get("exception"):
                row["exception"] = extra["exception"]
            if not holds and extra.get("leads"):
                row["leads"] = True
        return row

    def _note_symbol(self, entry: Entry) -> None:
        symbol = self._known.get(entry.symbol) or _symbol_of(entry) or symbol_from_id(entry.symbol)
        if not symbol.meaning or not symbol.unit:
            symbol = Symbol(
                symbol.id, symbol.base, symbol.sub, symbol.sup,
                symbol.meaning or _title_of(entry), symbol.unit or entry.unit,
            )  # fmt: skip
        self._used.setdefault(entry.symbol, symbol)
        if entry.kind in (LINE, FOUND):
            for name, arg in zip(entry.source.names, entry.args, strict=True):
                if name != arg.symbol:
                    self._used.setdefault(name, self._known.get(name) or symbol_from_id(name))


def _check_kinds(entry: Entry) -> None:
    """Refuse an argument of another kind than the formula's own notation gives its name.

    The units of a formula are proved once, with its notation; a length passed as a force would
    compute without a word.
    """
    known = getattr(entry.source, "notation", None)
    if not known:
        return
    for name, arg in zip(entry.source.names, entry.args, strict=True):
        symbol = known.get(name)
        wanted = UNITS[symbol.unit].kind if symbol is not None else UNITS[arg.unit].kind
        if UNITS[arg.unit].kind != wanted:
            raise UserError(
                f"{entry.id}: {name} is a {wanted}, but {arg.id} is a {UNITS[arg.unit].kind}"
            )


def _title_of(entry: Entry) -> str:
    """Return the title of an entry: its own, else that of what it was made by."""
    return str((entry.extra or {}).get("title") or entry.source.title)


def _symbol_of(entry: Entry) -> Symbol | None:
    symbol = entry.source.symbol
    return symbol if isinstance(symbol, Symbol) else None


def _shown_arguments(args: Iterable[Entry]) -> dict[str, str]:
    """Name what a figure rests on by symbol; where two share it, the later ones by id."""
    named: dict[str, str] = {}
    for arg in args:
        named[arg.id if arg.symbol in named else arg.symbol] = arg.id
    return named


def _arguments(names: Iterable[str], args: Iterable[Entry]) -> dict[str, str]:
    return {name: arg.id for name, arg in zip(names, args, strict=True)}


def _to_confirm(
    entries: Iterable[Mapping[str, Any]], project: Mapping[str, Any], codes: Mapping[str, str]
) -> list[dict[str, Any]]:
    """Return what rests on memory, a row per clause, with the office's confirmation if there is."""
    rows: dict[str, dict[str, Any]] = {}
    for entry in entries:
        if FROM_MEMORY in str(entry["basis"]):
            clause, basis = entry["clause"], str(entry["basis"])
            empty = {"clause": clause, "what": "", "basis": basis, "confirmed": "", "lines": []}
            row = rows.setdefault(clause, empty)
            # What says more than "from memory" is the reason to look the clause up.
            row["basis"] = max(row["basis"], basis, key=len)
            title = begun(entry["title"])
            if title not in row["what"].split("; "):
                row["what"] = f"{row['what']}; {title}" if row["what"] else title
            row["lines"].append(entry["id"])
    for signed in _confirmations(project, codes):
        found = rows.get(str(signed.get("clause")))
        # A changed clause is confirmed by the value that stands in the office's copy, no less.
        if found and (EARLIER_EDITION not in found["basis"] or "value" in signed):
            found["confirmed"] = f"{signed.get('by', '')}, {signed.get('on', '')}"
    return list(rows.values())


def _confirmations(
    project: Mapping[str, Any], codes: Mapping[str, str]
) -> Iterator[Mapping[str, Any]]:
    """Give the office's confirmations for the editions of this calculation."""
    editions = {codes.get("concrete"), codes.get("building")}
    for row in project.get("confirmed", ()):
        if isinstance(row, Mapping) and row.get("edition") in editions:
            yield row
