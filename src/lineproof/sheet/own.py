"""Criteria that a designer writes as text in the notebook."""

from __future__ import annotations

from collections.abc import Callable, Iterable

from lineproof.formula import Criterion, Name, Notation, criterion

Units = Callable[[Iterable[str]], dict[str, str]]


def own_criterion(
    text: str, unit: str | None, title: str, notation: Notation, units: Units
) -> Criterion:
    """Read a designer's criterion; both sides are printed in the unit of a bare side."""
    made = criterion(text, unit=unit, title=title, notation=notation)
    if unit is None:
        bare = [side.id for side in (made.left, made.right) if isinstance(side, Name)]
        known = units(made.names)
        printed = known[bare[0]] if bare else ""
        made = criterion(text, unit=printed, title=title, notation=notation)
    return made
