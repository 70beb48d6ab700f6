"""Reading claims: a filled table against a record, every fault with its row and what to write."""

from __future__ import annotations

import difflib
import re
import unicodedata
from dataclasses import dataclass
from functools import cached_property
from pathlib import Path

from lineproof.audit.claims.bars import (
    area_claimed,
    bars_in,
    refuse_one_bar,
    refuse_other_bars,
)
from lineproof.audit.claims.blank import quick_lines
from lineproof.audit.claims.tables import Row, Table, TableFaults, read_with_faults
from lineproof.audit.claims.typed import DATE_ADVICE, is_date, read_claimed
from lineproof.audit.data import Claim, read_from
from lineproof.audit.effects import place_of
from lineproof.audit.graph import Graph, Node
from lineproof.errors import MOST_FAULTS, UserError
from lineproof.quantity import echo, internal_factor
from lineproof.sentences import listed

CLAIMED = ("claimed", "value")
NAMES = ("id", "label", "symbol")
_WORDS = re.compile(r"[a-z0-9]+")
_GREEK = {
    "α": "alpha", "β": "beta", "γ": "gamma", "δ": "delta", "ε": "eps", "θ": "theta",
    "λ": "lambda", "μ": "mu", "ρ": "rho", "φ": "phi",
}  # fmt: skip
_FIRST = 20
"""So many rows are looked through for headings that stand below a title."""
_MOST_PLACES = 6
_MOST_HEADINGS = 8
_LONGEST_WHERE = 40


def read_claims(graph: Graph, path: Path) -> tuple[Claim, ...]:
    """Return the claims of a filled table, in the order of its rows; empty rows are passed over.

    A row names its line by ``id``, by ``label``, or by ``symbol`` with ``place``, and holds the
    number in ``claimed`` with its unit there or in ``unit``. Raises :class:`UserError` with all
    faults: lines not known (the nearest are named), units left out, duplicates, no numbers.
    """
    return claims_of(graph, *read_with_faults(path))


def claims_of(graph: Graph, table: Table, faults: TableFaults) -> tuple[Claim, ...]:
    """Return the claims of a table that has been read; faults as :func:`read_claims`."""
    column = next((name for name in CLAIMED if name in table.headings), None)
    lower = _headings_below(table)
    if column is None and lower:
        raise UserError(f"{table.name}: row {lower} holds the headings; delete the rows above it")
    held = ", ".join(echo(heading) for heading in table.headings[:_MOST_HEADINGS] if heading)
    if column is None:
        faults.add(f"row 1: no heading 'claimed' among {held}; write 'id,claimed,unit'")
    if not any(name in table.headings for name in NAMES):
        faults.add(f"row 1: no heading 'id', 'label' or 'symbol' among {held}; write 'id'")
    if column is None or not any(name in table.headings for name in NAMES):
        faults.raise_if_any()
    reader = _Reader(graph, faults)
    claims = [
        reader.claim(row, row.cells[column or ""])
        for row in table.rows
        if row.cells.get(column or "")
    ]
    if not claims and not faults.faults:
        faults.add(f"no row has a value in the column {column!r}; write one")
    faults.raise_if_any()
    return tuple(claim for claim in claims if claim is not None)


def _headings_below(table: Table) -> int:
    """Return the row that holds headings where a title stands above them; 0 for none."""
    rows = (row for row in table.rows[:_FIRST] if {*row.cells.values()} & {*NAMES, *CLAIMED})
    return next((row.number for row in rows), 0)


@dataclass(frozen=True)
class _Reader:
    """Reads rows of one table for one record; notes faults."""

    graph: Graph
    faults: TableFaults

    @cached_property
    def rows_by_id(self) -> dict[str, int]:
        """The row in which a line was claimed first; filled while reading."""
        return {}

    @cached_property
    def labels(self) -> dict[str, str]:
        return {node.label: node.id for node in self.graph if node.label}

    @cached_property
    def quick(self) -> frozenset[str]:
        return frozenset(quick_lines(self.graph))

    @cached_property
    def symbols(self) -> dict[str, list[Node]]:
        found: dict[str, list[Node]] = {}
        for node in self.graph:
            if node.has_value:
                found.setdefault(node.symbol, []).append(node)
        return found

    @cached_property
    def titles(self) -> dict[str, str]:
        return {part["key"]: str(part.get("title", "")) for part in self.graph.record.parts}

    def claim(self, row: Row, typed: str) -> Claim | None:
        node = self._line(row)
        if node is None:
            return None
        first = self.rows_by_id.setdefault(node.id, row.number)
        if first != row.number:
            fault = f"{node.id} is claimed in row {first} already; keep one of them"
            self.faults.at(row.number, "id", fault)
            return None
        return self._value(row, node, typed)

    # -- the line ----------------------------------------------------------------------------

    def _line(self, row: Row) -> Node | None:
        for name in NAMES:
            text = row.cells.get(name, "")
            if text:
                return self._named(row, name, text)
        self.faults.at(row.number, "id", "names no line; write the id that the blank table shows")
        return None

    def _named(self, row: Row, column: str, text: str) -> Node | None:
        # An id is no label, so it names its line there too; a label among the ids does not: a
        # spreadsheet makes 1.1 of 1.10.
        known = self.labels.get(text, text) if column == "label" else text
        longer = self.graph.nodes.get(self.labels.get(f"{text}0", ""))
        if known != text and longer is not None and not row.cells.get("symbol"):
            self.faults.at(
                row.number, column, f"{echo(text)} may be {text}0, of which a spreadsheet makes "
                f"{text}; write the symbol beside it, {self.graph[known].symbol!r} or "
                f"{longer.symbol!r}, or the id"
            )  # fmt: skip
            return None
        node = self.graph.nodes.get(known)
        if node is not None and not node.has_value:
            fault = f"{echo(text)} is a {node.kind} and has no value; claim the lines it compares"
            self.faults.at(row.number, column, fault)
            return None
        if node is not None:
            return self._not_another(row, node)
        if column != "label" and text in self.symbols:
            return self._by_symbol(row, column, text)
        self.faults.at(
            row.number, column, f"{echo(text)} is not a line of this calc{self._hint(text)}"
        )
        return None

    def _not_another(self, row: Row, node: Node) -> Node | None:
        """Refuse a row whose symbol is that of another line, as after one column was sorted."""
        symbol = row.cells.get("symbol", "")
        if symbol in ("", node.symbol) or symbol not in self.symbols:
            return node
        self.faults.at(
            row.number, "symbol", f"{echo(symbol)}, but {node.id} is {node.symbol}; see whether "
            "columns were sorted apart, and write both of one line"
        )  # fmt: skip
        return None

    def _by_symbol(self, row: Row, column: str, symbol: str) -> Node | None:
        nodes = self.symbols[symbol]
        place = row.cells.get("place", "")
        if place:
            nodes = self._at(place, nodes)
            quick = [node for node in nodes if node.id in self.quick]
            nodes = quick if len(quick) == 1 else nodes
        if len(nodes) == 1:
            return nodes[0]
        shown = nodes or self.symbols[symbol]
        ids = listed((node.id for node in shown), _MOST_PLACES)
        at = f" at {echo(place)}" if place else ""
        count = f"stands in {len(nodes)} places" if nodes else "stands nowhere"
        self.faults.at(row.number, column, f"{symbol} {count}{at}; write one of {ids}")
        return None

    def _at(self, place: str, nodes: list[Node]) -> list[Node]:
        """Return the lines at a place: its words all stand in the part's key or title."""
        exact = [n for n in nodes if place in (n.part, self.titles[n.part])]
        same = [n for n in nodes if place_of(self.titles[n.part]).lower() == place.lower()]
        wanted = set(_words(place))
        some = [n for n in nodes if wanted <= set(_words(f"{n.part} {self.titles[n.part]}"))]
        return exact or same or some

    def _hint(self, text: str) -> str:
        if len(self.faults.faults) >= MOST_FAULTS:
            return ""  # no longer told, and looking takes long
        if is_date(text):
            return f"; a spreadsheet made a date of it, so {DATE_ADVICE}"
        if text in self.labels:
            return ", but a label; write it under the heading 'label'"
        names = [*self.symbols, *(node.id for node in self.graph if node.has_value)]
        alike = [name for name in names if name.lower() == text.lower()] or [
            symbol for symbol in self.symbols if _folded(symbol) == _folded(text[:80])
        ]
        near = alike or difflib.get_close_matches(text[:80], names, n=3, cutoff=0.6)
        return f"; write {' or '.join(map(repr, near))}" if near else "; take the id of a blank"

    # -- the value ---------------------------------------------------------------------------

    def _value(self, row: Row, node: Node, typed: str) -> Claim | None:
        text = " ".join(typed.split())
        bars = text if bars_in(text) else ""
        try:
            text = f"{area_claimed(self.graph, node, bars)} mm2" if bars else text
            unit = row.cells.get("unit") or row.cells.get("units", "")
            refuse_one_bar(node, text)
            refuse_other_bars(self.graph, node, text)
            read = read_claimed(node, text, unit)
        except UserError as error:
            self.faults.at(row.number, "claimed", error.faults[0])
            return None
        stands_for = read_from(read.number).times(internal_factor(read.unit))
        where = " ".join(row.cells.get("where", "").split())[:_LONGEST_WHERE]
        return Claim(
            node.id, read.number, read.unit, read.value, stands_for, row.number, where, bars
        )


def _folded(symbol: str) -> str:
    """Return a symbol without what people write otherwise: capitals, marks, letters of Greek.

    >>> _folded("φc"), _folded("phi_c"), _folded("Mᵣ"), _folded("f'c")
    ('phic', 'phic', 'mr', 'fc')
    """
    plain = unicodedata.normalize("NFKC", symbol).lower()
    return "".join(_GREEK.get(letter, letter) for letter in plain if letter.isalnum())


def _words(text: str) -> list[str]:
    return _WORDS.findall(text.lower())
