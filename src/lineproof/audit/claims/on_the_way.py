"""Lines that nobody claimed are rounded too: what follows where they were written with few digits.

Who works by hand writes 22.6 kN/m for 22.56 and goes on with it. Where the table asks for the
reaction alone, 94.9 kN for 94.8 is no slip. Each way of rounding gives one value, not a band, so
that no more than such a value is let pass. Who rounds one line to three digits and the next to four
has many more values: :mod:`lineproof.audit.claims.mixed_digits`.
"""

from __future__ import annotations

import math
from collections.abc import Collection, Iterable, Mapping
from typing import NamedTuple

from lineproof.audit.claims.propagate import Form, Worker, World
from lineproof.audit.data import Interval, Judged
from lineproof.audit.graph import Graph, Node
from lineproof.errors import UserError
from lineproof.formula.compiled import NOT_COMPUTED
from lineproof.quantity.digits import significant
from lineproof.quantity.units import internal_factor
from lineproof.sentences import counted, listed

FOLLOWS = "follows where lines that are not claimed are rounded to"
"""How the note begins of a line that agrees so."""
_MOST_NAMED = 6
_TIE = 1e-9
_LARGEST_WHOLE = 1e5
"""Millimetres and square millimetres are written whole up to here."""
_ALL = 40
"""Lines in a row that are rounded; no table leaves out so many."""


class _Way(NamedTuple):
    """How lines are rounded: to so many digits, in whole units at least, how many in a row."""

    digits: int
    whole: bool
    lines: int


_WAYS = (
    _Way(3, whole=False, lines=_ALL), _Way(3, whole=True, lines=_ALL),
    _Way(4, whole=False, lines=_ALL), _Way(3, whole=False, lines=1), _Way(3, whole=True, lines=1),
)  # fmt: skip


class OnTheWay:
    """What lines are where the lines above them that nobody claimed are rounded."""

    def __init__(self, worker: Worker, claimed: Collection[str]) -> None:
        self.worker, self.claimed = worker, claimed
        self._kept: dict[tuple[int, str, _Way], Form] = {}

    def met(self, world: World, node: Node, stands_for: Interval) -> tuple[Interval, int] | None:
        """Return the first of a line's values that a claim meets, with the digits; None if none."""
        if not self.is_open(node):
            return None
        for way in _WAYS:
            try:
                interval = self._worked(world, node, way).interval
            except (*NOT_COMPUTED, UserError):
                continue
            if stands_for.meets(interval):
                return interval, way.digits
        return None

    def is_open(self, node: Node) -> bool:
        """Tell whether a line rests on one, next to it, that nobody claimed."""
        return any(map(self._is_open, node.args.values()))

    def _is_open(self, entry_id: str) -> bool:
        return entry_id not in self.claimed and self.worker.graph[entry_id].is_computed

    def _worked(self, world: World, node: Node, way: _Way) -> Form:
        used = {
            i: self._rounded(world, self.worker.graph[i], way)
            if self._is_open(i) else world.used[i]
            for i in node.args.values()
        }  # fmt: skip
        return self.worker.form(node, used)

    def _rounded(self, world: World, node: Node, way: _Way) -> Form:
        key = id(world), node.id, way
        if key not in self._kept:
            above = way._replace(lines=way.lines - 1)
            form = self._worked(world, node, above) if above.lines else world.used[node.id]
            self._kept[key] = _written(form, internal_factor(node.unit), way)
        return self._kept[key]


def as_rounded(
    graph: Graph, used: Mapping[str, Interval], claimed: Collection[str]
) -> dict[str, Interval]:
    """Return what lines may be where those that nobody claimed were written with three digits."""
    return {
        i: _widened(interval, internal_factor(graph[i].unit))
        if i not in claimed and graph[i].is_computed else interval
        for i, interval in used.items()
    }  # fmt: skip


def _widened(interval: Interval, unit: float) -> Interval:
    size = abs(interval.middle) / unit
    if not size or not math.isfinite(size):
        return interval
    half = 10.0 ** (math.floor(math.log10(size)) - 2) / 2 * unit
    return Interval(interval.low - half, interval.high + half)


def rounding_note(graph: Graph, judged: Iterable[Judged]) -> str:
    """Return the sentence on claims that agree so; nothing where none does."""
    found = [each.id for each in judged if each.note.startswith(FOLLOWS)]
    if not found:
        return ""
    named = listed((f"{graph[i].symbol} ({graph[i].label})" for i in found), _MOST_NAMED)
    follow = counted(len(found), "claim follows", "claims follow")
    return (
        f"{follow} where lines that are not claimed are rounded to three or four digits, as by "
        f"hand: {named}. That is no error."
    )


def _written(form: Form, unit: float, way: _Way) -> Form:
    """Return a value as it is written; one that may be either of two numbers lies between them."""
    low, high = (
        _number((form.middle + end * form.rest) / unit, way, end) * unit for end in (-1, 1)
    )
    return Form((low + high) / 2, form.parts, abs(high - low) / 2)


def _number(value: float, way: _Way, end: int) -> float:
    """Return a number as it is written; one in the middle between two goes towards an end."""
    size = abs(value)
    if not size:
        return value
    whole = way.whole and 10**way.digits <= size < _LARGEST_WHOLE
    number = significant(size, 0 if whole else way.digits)
    step = 10.0 ** int(number.as_tuple().exponent)
    off = size - float(number)
    if abs(abs(off) - step / 2) <= _TIE * size:
        return value + end * step / 2
    return math.copysign(float(number), value)
