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
class ScopeBox:
    """What is preliminary and not covered, with the calcs that it holds for."""

    calcs: str
    scope: str
    not_covered: tuple[NotCovered, ...]


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
    shared = _grouped(calcs, lambda calc: (calc.scope, calc.not_covered))
    return tuple(
        ScopeBox(", ".join(calc.id for calc in group), scope, not_covered)
        for (scope, not_covered), group in shared
        if scope or not_covered
    )


def uncovered(calcs: Iterable[Calc]) -> tuple[ScopeBox, ...]:
    """Return each list of what is not covered once, with the calcs that share it."""
    shared = _grouped(calcs, lambda calc: calc.not_covered)
    return tuple(
        ScopeBox(", ".join(calc.id for calc in group), "", not_covered)
        for not_covered, group in shared
        if not_covered
    )


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
