"""The values that stand for a symbol at a place of a record, and how a sentence names a line."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from functools import cached_property

from lineproof.audit.data import Finding, Interval, Severity, read_from
from lineproof.audit.graph import Graph, Node
from lineproof.quantity import UNITS
from lineproof.quantity.units import internal_factor
from lineproof.record import Record
from lineproof.record.entry import CRITERIA, FOUND, LINE

SOURCE = "notebook"
"""Where these findings come from."""
VALIDATION = "predictions against published values"
"""The kind of a calculation that follows other codes on purpose."""


class Scope:
    """A record's lines by symbol and part."""

    def __init__(self, record: Record) -> None:
        self.record = record
        self.graph = Graph(record)

    @cached_property
    def by_symbol(self) -> Mapping[str, tuple[Node, ...]]:
        """The lines with a value by symbol, in order."""
        found: dict[str, list[Node]] = {}
        for node in self.graph:
            if node.has_value:
                found.setdefault(node.symbol, []).append(node)
        return {symbol: tuple(nodes) for symbol, nodes in found.items()}

    @cached_property
    def order(self) -> Mapping[str, int]:
        """The place of every line in the record."""
        return {entry_id: place for place, entry_id in enumerate(self.graph.nodes)}

    def find(self, name: str, part: str, args: Mapping[str, str] | None = None) -> Node | None:
        """Return what a name stands for: an argument, a line of the part, the only one there is."""
        if args and name in args:
            return self.graph[args[name]]
        nodes = self.by_symbol.get(name, ())
        inside = [node for node in nodes if node.part == part]
        if inside:
            return inside[0]
        alike = {round(node.stored, 9) for node in nodes}
        return nodes[0] if len(alike) == 1 else None

    @cached_property
    def own_parts(self) -> frozenset[str]:
        """The parts that the designer wrote himself.

        A calculation that no beam made is his altogether. Else a part is his if its lines carry
        no basis, as those of the catalogue do.
        """
        member = str(self.record.data["kind_of_member"])
        if member == VALIDATION:
            return frozenset()
        keys = [part["key"] for part in self.record.parts]
        if not member:
            return frozenset(keys)
        return frozenset(key for key in keys if self._is_own(key))

    def _is_own(self, key: str) -> bool:
        steps = [n for n in self.graph if n.part == key and n.kind in (LINE, FOUND, *CRITERIA)]
        own = [n for n in steps if not n.entry["basis"] and not n.entry["clause"]]
        return bool(own) and 2 * len(own) >= len(steps)


def name_of(node: Node) -> str:
    """Return how a sentence calls a line: its label and id.

    The label is what stands on the page, the id what stands in the record.
    """
    return f"{node.label} {node.id}".strip()


def printed(node: Node) -> str:
    """Return a line's value as printed, with its unit."""
    shown = node.entry["printed"]
    return f"{shown['result']} {shown['unit']}".strip()


def shown_in(value: float, unit: str) -> str:
    """Return an internal value in a unit, to four digits."""
    return f"{value / internal_factor(unit):.4g} {unit}".strip()


def stands_for(node: Node) -> Interval:
    """Return what a line's printed value stands for, in internal units."""
    shown = node.entry["printed"]
    return read_from(shown["result"]).times(internal_factor(shown["unit"]))


def units_of(record: Record) -> dict[str, str]:
    """Return the unit of every symbol of a record."""
    found = {row["id"]: row["unit"] for row in record.data["notation"]}
    return {symbol: unit for symbol, unit in found.items() if unit in UNITS}


def finding(
    severity: Severity, what: str, ids: Iterable[str] = (), clause: str = "", advice: str = ""
) -> Finding:
    """Return a finding of this search."""
    return Finding(SOURCE, severity, what, tuple(ids), clause, advice)
