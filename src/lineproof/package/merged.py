"""What several calcs of a package say alike, said once: scopes, values to confirm."""

from __future__ import annotations

from collections.abc import Callable, Hashable, Iterable, Sequence
from dataclasses import dataclass
from typing import TypeVar

from lineproof.package.calc import Calc, NotCovered
from lineproof.package.summary import Confirmation

Key = TypeVar("Key", bound=Hashable)
Item = TypeVar("Item")
Lines = tuple[tuple[str, str], ...]
"""Anchors and labels of lines."""


@dataclass(frozen=True, slots=True)
class NotCoveredBy:
    """What some calcs do not cover."""

    calcs: str
    not_covered: tuple[NotCovered, ...]


@dataclass(frozen=True, slots=True)
class ScopeBox:
    """What is preliminary, and what is not covered: by all its calcs, then by some of them."""

    calcs: str
    scope: str
    lists: tuple[NotCoveredBy, ...]

    @property
    def not_covered(self) -> str:
        """Say what is not covered, a sentence for each list; "" if all is."""
        return " ".join(self._sentence(each) for each in self.lists)

    def _sentence(self, each: NotCoveredBy) -> str:
        where = "" if each.calcs == self.calcs else f" in {each.calcs} only"
        return f"Not covered yet{where}: {'; '.join(item.text for item in each.not_covered)}."


@dataclass(frozen=True, slots=True)
class ToConfirm:
    """A clause to confirm with the lines of each calc that rest on it.

    ``confirmed`` stays empty while one of the calcs needs it confirmed.
    """

    clause: str
    what: str
    basis: str
    confirmed: str
    calcs: tuple[tuple[str, Lines], ...]


def scopes(calcs: Iterable[Calc]) -> tuple[ScopeBox, ...]:
    """Return each scope once, with the calcs that share it."""
    said = [calc for calc in calcs if calc.scope or calc.not_covered]
    return tuple(
        ScopeBox(_named(group), scope, uncovered(group))
        for scope, group in _grouped(said, lambda calc: calc.scope)
    )


def uncovered(calcs: Iterable[Calc]) -> tuple[NotCoveredBy, ...]:
    """Return what is not covered, each item once: first by all calcs, then by some of them."""
    several = list(calcs)
    items = dict.fromkeys(item for calc in several for item in calc.not_covered)
    pairs = [(_named(c for c in several if item in c.not_covered), item) for item in items]
    lists = [
        NotCoveredBy(named, tuple(item for _, item in group))
        for named, group in _grouped(pairs, lambda pair: pair[0])
    ]
    return tuple(sorted(lists, key=lambda each: each.calcs != _named(several)))


def _named(calcs: Iterable[Calc]) -> str:
    return ", ".join(calc.id for calc in calcs)


def to_confirm(calcs: Iterable[Calc]) -> tuple[ToConfirm, ...]:
    """Return every clause to confirm once, over all calcs."""
    pairs = [(calc.id, item) for calc in calcs for item in calc.confirm]
    return tuple(
        _merged(clause, group) for clause, group in _grouped(pairs, lambda pair: pair[1].clause)
    )


def _merged(clause: str, pairs: Sequence[tuple[str, Confirmation]]) -> ToConfirm:
    items = [item for _, item in pairs]
    named = dict.fromkeys(what for item in items for what in item.what.split("; "))
    open_ones = not all(item.confirmed for item in items)
    return ToConfirm(
        clause=clause,
        what="; ".join(named),
        # What says more than "from memory" is the reason to look the clause up.
        basis=max((item.basis for item in items), key=len),
        confirmed="" if open_ones else "; ".join(dict.fromkeys(i.confirmed for i in items)),
        calcs=tuple((calc, item.lines) for calc, item in pairs),
    )


def unconfirmed(items: Iterable[ToConfirm]) -> str:
    """Say how many clauses rest on memory and are not confirmed by the office; "" if none."""
    count = sum(not item.confirmed for item in items)
    if not count:
        return ""
    are = "clause is" if count == 1 else "clauses are"
    return (
        f"{count} {are} taken from memory of the standards and not yet confirmed by the "
        "office: see Values to confirm."
    )


def _grouped(items: Iterable[Item], key: Callable[[Item], Key]) -> list[tuple[Key, list[Item]]]:
    """Gather items of one key, in the order in which the keys first come."""
    groups: dict[Key, list[Item]] = {}
    for item in items:
        groups.setdefault(key(item), []).append(item)
    return list(groups.items())
