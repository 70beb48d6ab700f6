"""What stands near a line: quantities of the same unit in its part, its kin, its neighbours."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Mapping
from functools import cached_property, lru_cache

from lineproof.audit.data import Interval
from lineproof.audit.graph import Graph, Node
from lineproof.audit.slips.tree import Pair, Place, places_of
from lineproof.formula import Name
from lineproof.quantity.units import UNITS

MOST_KEPT = 4
"""Scopes of so many records are kept: the lines of one record are asked one after another."""
_NUMBERS = re.compile(r"\d+")
_TAIL = re.compile(r"(?<=[A-Za-z])\d+\Z|_\d+\Z")
LOADS = ("N", "N.mm", "N/mm", "MPa")
"""Internal units of loads and of what they do."""


@lru_cache(maxsize=4096)
def stem(symbol: str) -> str:
    """Return a symbol without the number of its place: ``w_D1`` and ``w_D2`` are both ``w_D``.

    >>> stem("w_D1"), stem("l_2"), stem("M_2D"), stem("alpha_1")
    ('w_D', 'l', 'M_D', 'alpha_1')
    """
    if symbol in ("alpha_1", "beta_1", "k_1", "k_2", "k_3", "k_4"):
        return symbol
    inner = re.sub(r"_\d+(?=[A-Z])", "_", symbol)
    return _TAIL.sub("", inner)


class Pairs(dict[str, Pair]):
    """Values by id with half the width of what they stand for; read from intervals when asked.

    ``typed`` holds the numbers of those claimed as they were typed.
    """

    def __init__(
        self, graph: Graph, used: Mapping[str, Interval], typed: Mapping[str, str]
    ) -> None:
        super().__init__()
        self.stored, self.used, self.typed = graph.stored, used, typed

    def copied(self) -> Pairs:
        """Return a copy, in which a pair may be put without changing this one."""
        other = Pairs.__new__(Pairs)
        other.stored, other.used, other.typed = self.stored, self.used, self.typed
        other.update(self)
        return other

    def __missing__(self, entry_id: str) -> Pair:
        interval = self.used.get(entry_id)
        value = self.stored[entry_id] if interval is None else interval.middle
        made = (value, 0.0 if interval is None else interval.half)
        self[entry_id] = made
        return made


class Scope:
    """The lines of a record, ordered for a search of what could have been taken for what."""

    def __init__(self, graph: Graph) -> None:
        self.graph = graph
        self.valued = [node for node in graph if node.has_value]
        self.units = {node.id: UNITS[node.unit].internal for node in self.valued}
        self.order = {entry_id: at for at, entry_id in enumerate(graph.nodes)}
        self.symbols = {node.id: node.symbol for node in self.valued}
        self.stems = {node.id: stem(node.symbol) for node in self.valued}
        self._places: dict[str, tuple[Place, ...]] = {}
        self._near: dict[str, dict[str, list[str]]] = {}

    @cached_property
    def by_symbol(self) -> dict[str, list[str]]:
        """The ids of a symbol, in the order of the record."""
        found: dict[str, list[str]] = {}
        for entry_id, symbol in self.symbols.items():
            found.setdefault(symbol, []).append(entry_id)
        return found

    @cached_property
    def by_stem(self) -> dict[tuple[str, str], list[str]]:
        """The ids of a symbol without the number of its place, by internal unit as well."""
        found: dict[tuple[str, str], list[str]] = {}
        for entry_id, own in self.stems.items():
            found.setdefault((own, self.units[entry_id]), []).append(entry_id)
        return found

    @cached_property
    def by_part(self) -> dict[str, list[Node]]:
        """The lines of a part, checks and decisions included."""
        found: dict[str, list[Node]] = {}
        for node in self.graph:
            found.setdefault(node.part, []).append(node)
        return found

    @cached_property
    def _different(self) -> dict[tuple[str, str, str], list[str]]:
        found: dict[tuple[str, str, str], dict[str, str]] = {}
        for node in self.valued:
            key = (_first_number(node.part), self.units[node.id], node.symbol[0])
            value = f"{self.graph.stored[node.id]:.9g}"
            found.setdefault(key, {}).setdefault(value, node.id)
        return {key: list(ids.values()) for key, ids in found.items()}

    def far(self, part: str, unit: str, letter: str) -> list[str]:
        """Return quantities of a span with one unit and first letter, one for each value."""
        return self._different.get((_first_number(part), unit, letter), [])

    def places(self, node: Node) -> tuple[Place, ...]:
        """Return the places of a line's formula; a value without formula is one place."""
        made = self._places.get(node.id)
        if made is None:
            tree = node.tree if node.tree is not None else Name(node.symbol)
            made = self._places[node.id] = places_of(tree)
        return made

    def near(self, part: str, unit: str) -> list[str]:
        """Return what stands in a part or is used in it, of one internal unit, in order."""
        by_unit = self._near.get(part)
        if by_unit is None:
            by_unit = self._near[part] = self._all_near(part)
        return by_unit.get(unit, [])

    def _all_near(self, part: str) -> dict[str, list[str]]:
        ids: dict[str, None] = {}
        for node in self.by_part.get(part, ()):
            ids |= dict.fromkeys([node.id, *node.args.values()])
        found: dict[str, list[str]] = {}
        for entry_id in ids:
            if entry_id in self.units:
                found.setdefault(self.units[entry_id], []).append(entry_id)
        return found

    def kin(self, entry_id: str) -> Iterator[str]:
        """Give what uses a value at once and what it rests on, of the same unit."""
        unit = self.units[entry_id]
        for other in (*self.graph.users[entry_id], *self.graph.sources[entry_id]):
            if self.units.get(other) == unit:
                yield other

    @cached_property
    def by_span(self) -> dict[tuple[str, str], list[str]]:
        """The ids by the first number of their part and by stem."""
        found: dict[tuple[str, str], list[str]] = {}
        for node in self.valued:
            key = (_first_number(node.part), self.stems[node.id])
            found.setdefault(key, []).append(node.id)
        return found

    def same_span(self, part: str, stems: Iterable[str]) -> Iterator[str]:
        """Give the values of some symbols in parts that carry the same first number."""
        number = _first_number(part)
        for own in stems:
            yield from self.by_span.get((number, own), ())


@lru_cache(maxsize=MOST_KEPT)
def scope_of(graph: Graph) -> Scope:
    """Return the scope of a record's graph."""
    return Scope(graph)


@lru_cache(maxsize=4096)
def _first_number(part: str) -> str:
    found = _NUMBERS.search(part)
    return found[0] if found else ""


@lru_cache(maxsize=4096)
def is_next(first: str, second: str) -> bool:
    """Tell whether two parts are neighbours: left and right of one place, or one number apart.

    >>> is_next("hog-2-left", "hog-2-right"), is_next("sag-1", "sag-2"), is_next("sag-1", "sag-3")
    (True, True, False)
    """
    if _mirrored(first) == second:
        return True
    numbers = [[int(n) for n in _NUMBERS.findall(key)] for key in (first, second)]
    if _NUMBERS.sub("#", first) != _NUMBERS.sub("#", second):
        return False
    return sum(abs(a - b) for a, b in zip(numbers[0], numbers[1], strict=True)) == 1


def _mirrored(key: str) -> str:
    swap = {"left": "right", "right": "left"}
    return re.sub("left|right", lambda found: swap[found[0]], key)
