"""Other quantities of the same unit that may be taken for one: known pairs, kin, other places."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from functools import lru_cache, partial
from typing import NamedTuple

from lineproof.audit.slips.edits import Edit, Line, words_of
from lineproof.audit.slips.kinship import PAIRS, PARTNERS, SERVICE
from lineproof.audit.slips.scope import is_next
from lineproof.typeset.values import told


class Other(NamedTuple):
    """Another value for a quantity: family, value, half width, words, and how far-fetched.

    ``took`` is the id of the line whose value it is, where it is that of another line;
    ``published`` tells a value that another document prints.
    """

    family: str
    value: float
    half: float
    words: Callable[[], str]
    far: float = 0.0
    took: str = ""
    published: bool = False

    def edit(self, at: tuple[int, ...], replaced: str, far: float = 0.0) -> Edit:
        """Return the edit that puts it at some places for the value with the id ``replaced``."""
        swap, far = (replaced, self.took), self.far + far
        return Edit(self.family, at, self.value, self.half, self.words, far, swap, self.published)


def shown(line: Line, entry_id: str, value: float | None = None) -> str:
    """Return a value in its printed unit: ``380 mm``."""
    node = line.scope.graph[entry_id]
    number = line.pairs[entry_id][0] if value is None else value
    return told(node.number_text(number) if number else "0", node.unit)


def _in_place(line: Line, other: str, target: str, name: str) -> str:
    return (
        f"{words_of(line.scope, other)} = {shown(line, other)} in place of "
        f"{words_of(line.scope, target, name)} = {shown(line, target)}"
    )


def other_quantities(line: Line, target: str, name: str) -> Iterator[Other]:
    """Give the values of other quantities that may stand by a slip where ``target`` belongs."""
    scope = line.scope
    unit, own = scope.units[target], scope.symbols[target]
    seen = {target, line.node.id}
    near = [*scope.near(line.node.part, unit), *scope.kin(target)]
    for partners in {PARTNERS.get(scope.stems[target], ()), PARTNERS.get(name, ())}:
        near += scope.same_span(line.node.part, partners)
        near += scope.same_span("", partners)
    for other in near:
        if other in seen or scope.units[other] != unit:
            continue
        seen.add(other)
        yield other_quantity(line, _kinship(line, target, other, name), other, target, name)
    # One of the many places with the same value is enough; the next ones are looked at first.
    values = {line.pairs[other][0] for other in seen}
    elsewhere = [(_place(line, target, other), other) for other in _elsewhere(line, target, seen)]
    if line.above:
        elsewhere = [pair for pair in elsewhere if pair[0] == "mirror"]
    else:
        elsewhere.sort(key=lambda pair: pair[0] == "place")
        elsewhere += [("far", other) for other in scope.far(line.node.part, unit, own[0])]
    for family, other in elsewhere:
        value = line.pairs[other][0]
        if value not in values:
            values.add(value)
            yield other_quantity(line, family, other, target, name)


def other_quantity(line: Line, family: str, other: str, target: str, name: str) -> Other:
    """Return another quantity in place of one."""
    value, half = line.pairs[other]
    words = partial(_in_place, line, other, target, name)
    return Other(family, value, half, words, took=other)


def _place(line: Line, target: str, other: str) -> str:
    """Return the family of the same quantity elsewhere: next to it, or anywhere."""
    scope = line.scope
    if scope.symbols[target] != scope.symbols[other]:
        return "mirror"
    here, there = scope.graph[target].part, scope.graph[other].part
    return "mirror" if is_next(here, there) or is_next(line.node.part, there) else "place"


def _elsewhere(line: Line, target: str, seen: set[str]) -> Iterator[str]:
    """Give the same quantity elsewhere, also of another span, support or load case."""
    scope = line.scope
    own, stem = scope.symbols[target], scope.stems[target]
    yield from (other for other in scope.by_symbol[own] if other not in seen)
    if stem != own:
        for other in scope.by_stem[stem, scope.units[target]]:
            if scope.symbols[other] != own and other not in seen:
                yield other


def _kinship(line: Line, target: str, other: str, name: str) -> str:
    scope = line.scope
    stem, theirs = scope.stems[target], scope.stems[other]
    if theirs == stem:
        return _place(line, target, other)
    if theirs == scope.stems[line.node.id]:
        return "far"  # the result of another place, for what this one is worked of
    return _taken_for(stem, name, theirs)


@lru_cache(maxsize=4096)
def _taken_for(stem: str, name: str, theirs: str) -> str:
    stems = {stem, name}
    if {"l", "l_n"} in ({own, theirs} for own in stems):
        return "clear span"
    if any(frozenset((own, theirs)) in PAIRS for own in stems):
        return "pair"
    if any(theirs in SERVICE.get(own, ()) for own in stems):
        return "service"
    same_letter = theirs[0] in {own[0] for own in stems if own}
    return "kin" if same_letter else "near"
