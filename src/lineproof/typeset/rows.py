"""One entry of a record as a row of the package: worded once for HTML, PDF and the notebook.

A row holds nodes and plain texts only; how they are laid out is the business of its reader.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field, replace
from typing import Any

from lineproof.formula import FROM_MEMORY
from lineproof.formula.notation import Notation, Symbol
from lineproof.quantity.feet import one_unit
from lineproof.quantity.units import UNITS
from lineproof.sentences import begun
from lineproof.typeset.chains import Chain, criterion_chains, line_chain
from lineproof.typeset.nodes import EQUALS, Math, Word, row
from lineproof.typeset.plain import plain
from lineproof.typeset.values import (
    empirical_note,
    is_number,
    number_text,
    symbol_math,
    symbol_of,
    unit_text,
    value_math,
    value_text,
)

Entry = Mapping[str, Any]

_SYMBOL = re.compile(r"[A-Za-z][A-Za-z0-9]*_[A-Za-z0-9_]+\Z", re.ASCII)
"""A word of a heading that is no word but a symbol with a subscript."""
_SILENT_BASES = frozenset({"", FROM_MEMORY, "mechanics"})
FAILS_WORD = "FAILS"
"""How a cell of a table says that a check does not hold."""
_NO_FIGURE = frozenset({"", "-", "–", "—", FAILS_WORD})
HOLDS, FAILS, ACCEPTED = "holds", "does not hold", "accepted, does not hold"


@dataclass(frozen=True, slots=True)
class Origin:
    """Where an argument comes from: the entry's id, its printed label, its symbol."""

    id: str
    label: str
    symbol: Math


@dataclass(frozen=True, slots=True)
class PrintedTable:
    """A table: headings as nodes or text, cells as printed text, which columns hold numbers.

    ``widths`` are mm on paper as text, "" for what the texts need; ``lines`` give id and label of
    the line that each row shows, ("", "") for none.
    """

    columns: tuple[Math, ...]
    rows: tuple[tuple[str, ...], ...]
    numeric: tuple[bool, ...]
    widths: tuple[str, ...] = ()
    lines: tuple[tuple[str, str], ...] = ()


@dataclass(frozen=True, slots=True)
class PrintedRow:
    """One entry, ready to be laid out.

    ``inputs`` are the values that a procedure was given, ``chains`` hold the working, ``result``
    the last piece ("M_r = 551 kN·m"), ``verdict`` the word for a check or decision, ``ratio`` its
    printed utilisation, ``remarks`` short sentences in small print (source, numbers), ``basis``
    what the line rests on, where that is a text of its own.
    """

    id: str
    kind: str
    label: str
    title: str
    clause: str
    inputs: tuple[Math, ...] = ()
    chains: tuple[Chain, ...] = ()
    result: Math | None = None
    verdict: str = ""
    ratio: str = ""
    conclusion: str = ""
    remarks: tuple[str, ...] = ()
    basis: str = ""
    origins: tuple[Origin, ...] = ()
    text: str = ""
    table: PrintedTable | None = None
    figure: Mapping[str, Any] | None = field(default=None, hash=False)
    caption: str = ""
    alt: str = ""
    front: int | None = None

    @property
    def holds(self) -> bool:
        """Tell whether this row is no failed check."""
        return self.verdict not in (FAILS, ACCEPTED)

    @property
    def plain(self) -> str:
        """Return the row in plain text, one line per chain."""
        lines = [chain.plain for chain in self.chains]
        if self.result is not None:
            lines.append(plain(self.result))
        lines += [part for part in (self.verdict, self.conclusion, self.text) if part]
        return "\n".join([self.title, *lines]) if self.title else "\n".join(lines)


def notation_of(record: Mapping[str, Any]) -> Notation:
    """Return the notation that a record carries."""
    keys = ("id", "base", "sub", "sup", "meaning", "unit")
    return Notation(
        Symbol(**{key: str(symbol.get(key, "")) for key in keys}) for symbol in record["notation"]
    )


def printed_row(
    entry: Entry, notation: Notation, labels: Mapping[str, str] | None = None
) -> PrintedRow:
    """Return an entry of a record as a row; ``labels`` give the printed label of each entry id."""
    makers: dict[str, Callable[[Entry, Notation], dict[str, Any]]] = {
        "given": _given,
        "lookup": _lookup,
        "line": _line,
        "decision": _decision,
        "check": _check,
        "found": _found,
        "figure": _figure,
        "note": _note,
        "table": _table,
    }
    own = makers[entry["kind"]](entry, notation)
    if "lines" in entry:
        lines = tuple((line, (labels or {}).get(line, "")) for line in entry["lines"])
        own["table"] = replace(own["table"], lines=lines)
    return PrintedRow(
        id=entry["id"],
        kind=entry["kind"],
        label=entry.get("label", ""),
        title=begun(entry.get("title") or _meaning(entry, notation)),
        clause=entry.get("clause", ""),
        remarks=tuple(own.pop("remarks", ())),
        basis=_basis(entry),
        origins=_origins(entry.get("args", {}), notation, labels or {}),
        front=entry.get("front"),
        **own,
    )


def _meaning(entry: Entry, notation: Notation) -> str:
    """Return what a symbol means, for an entry without a title of its own."""
    symbol = notation.get(entry.get("symbol", ""))
    return symbol.meaning if symbol is not None else ""


def _origins(
    args: Mapping[str, str], notation: Notation, labels: Mapping[str, str]
) -> tuple[Origin, ...]:
    return tuple(
        Origin(source, labels.get(source, ""), _traced(name, source, notation))
        for name, source in args.items()
        # A figure or table names what it rests on by id; there is no symbol in it to trace.
        if source in labels and name.isidentifier()
    )


def _traced(name: str, source: str, notation: Notation) -> Math:
    """Return the symbol of an argument; where its line has another one, "b = b_f"."""
    symbol = symbol_math(symbol_of(name, notation))
    own = symbol_math(symbol_of(source.partition("/")[2], notation))
    return symbol if own == symbol else row([symbol, EQUALS, own])  # two names may print alike


def _basis(entry: Entry) -> str:
    """Return the basis if it says more than the clause does.

    Values from memory stand together on one page instead of marking every third line.
    """
    basis = str(entry.get("basis", ""))
    return "" if basis in _SILENT_BASES else basis


def _equation(entry: Entry, notation: Notation) -> Math:
    printed = entry["printed"]
    symbol = symbol_math(symbol_of(entry["symbol"], notation))
    return row([symbol, EQUALS, value_math(printed["result"], printed["unit"])])


def _given(entry: Entry, notation: Notation) -> dict[str, Any]:
    printed = entry["printed"]
    remarks = []
    if printed.get("typed"):
        typed = value_text(printed["typed"], printed["typed_unit"])
        text = str(entry.get("typed", ""))
        feet = one_unit(text) != text
        remarks.append(f"Typed as {text}, which is {typed}." if feet else f"Typed as {typed}.")
    if entry.get("source"):
        remarks.append(f"Source: {entry['source']}.")
    return {"result": _equation(entry, notation), "remarks": remarks}


def _lookup(entry: Entry, notation: Notation) -> dict[str, Any]:
    remarks = [f"Table: {entry['table']}, row {entry['row']}."]
    if entry.get("source"):
        remarks.append(f"Source: {entry['source']}.")
    return {"result": _equation(entry, notation), "remarks": remarks}


def _line(entry: Entry, notation: Notation) -> dict[str, Any]:
    note = empirical_note(entry.get("numbers") or {})
    remarks = [f"Units of the constants: {note}."] if note else []
    return {
        "chains": (line_chain(entry, notation),),
        "result": _equation(entry, notation),
        "remarks": remarks,
    }


def _decision(entry: Entry, notation: Notation) -> dict[str, Any]:
    return {
        "chains": criterion_chains(entry, notation),
        "verdict": "yes" if entry["holds"] else "no",
        "conclusion": entry.get("conclusion", ""),
    }


def _check(entry: Entry, notation: Notation) -> dict[str, Any]:
    exception = entry.get("exception")
    remarks = []
    if exception and not entry["holds"]:
        remarks.append(
            f"Exception accepted by {exception['initials']}: {exception['reason'].rstrip('.')}."
        )
    verdict = HOLDS if entry["holds"] else ACCEPTED if exception else FAILS
    ratio = entry["printed"].get("utilisation") or ""
    return {
        "chains": criterion_chains(entry, notation),
        "verdict": verdict,
        "ratio": number_text(ratio),
        "conclusion": entry.get("conclusion", ""),
        "remarks": remarks,
    }


def _found(entry: Entry, notation: Notation) -> dict[str, Any]:
    procedure, printed = entry["procedure"], entry["printed"]
    closing = entry.get("closing")
    title = procedure.get("title") or procedure["name"]
    text = f"Found by {title} (version {procedure['version']}), with"
    return {
        "inputs": _inputs(printed.get("args", {}), notation),
        "chains": criterion_chains(closing, notation) if closing else (),
        "result": _equation(entry, notation),
        "text": text if printed.get("args") else text.removesuffix(", with") + ".",
        "conclusion": _closing_sentence(closing),
    }


def _closing_sentence(closing: Mapping[str, Any] | None) -> str:
    """Say what the closing criterion shows."""
    if not closing:
        return ""
    return str(closing.get("conclusion") or "The closing criterion holds.")


def _inputs(args: Mapping[str, str], notation: Notation) -> tuple[Math, ...]:
    """Show what a procedure was given, each argument as symbol = value."""
    shown = []
    for name, text in args.items():
        symbol = symbol_of(name, notation)
        # Arguments are printed in the internal unit of their kind, as in any substitution.
        known = UNITS.get(symbol.unit)
        value = value_math(text, known.internal if known else "")
        shown.append(row([symbol_math(symbol), EQUALS, value]))
    return tuple(shown)


def _figure(entry: Entry, _: Notation) -> dict[str, Any]:
    return {
        "figure": entry["figure"],
        "caption": entry.get("caption", ""),
        "alt": entry.get("alt", ""),
    }


def _note(entry: Entry, _: Notation) -> dict[str, Any]:
    return {"text": entry["text"]}


def _table(entry: Entry, notation: Notation) -> dict[str, Any]:
    columns = tuple(heading_math(column, notation) for column in entry["columns"])
    rows = tuple(tuple(number_text(cell) for cell in line) for line in entry["rows"])
    numeric = tuple(
        all(_is_figure(line[place]) for line in entry["rows"]) for place in range(len(columns))
    )
    widths = tuple(f"{width:g}" if width else "" for width in entry.get("widths", ()))
    return {"table": PrintedTable(columns, rows, numeric, widths or ("",) * len(columns))}


def fails(cell: str) -> bool:
    """Tell whether a cell of a table says that a check fails.

    >>> fails("FAILS"), fails("1.04 FAILS"), fails("fails")
    (True, True, False)
    """
    return cell.endswith(FAILS_WORD)


def _is_figure(cell: str) -> bool:
    """Tell whether a cell leaves its column one of numbers."""
    return cell in _NO_FIGURE or is_number(cell.removesuffix(FAILS_WORD).rstrip())


def heading_math(text: str, notation: Notation) -> Math:
    """Typeset a column heading: "M_r, kN.m" becomes symbol and unit, other text stays text.

    The unit after the last comma is typeset in any case, a symbol also where words follow it.
    """
    head, comma, unit = (part.strip() for part in text.rpartition(","))
    if not comma or unit not in UNITS:
        head, unit = text.strip(), ""
    tail = f", {unit_text(unit)}" if unit else ""
    first, _, rest = head.partition(" ")
    if head in notation:
        symbol = symbol_math(notation[head])
        return row([symbol, Word(tail)]) if tail else symbol
    if _SYMBOL.match(first):
        return row([symbol_math(symbol_of(first, notation)), Word(f" {rest}".rstrip() + tail)])
    return Word(head + tail)
