"""Groups of loads that are placed together, and the symbols of the moments they give."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from functools import lru_cache
from typing import Any

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.model import Model, SingleLoad, near_support
from lineproof.beams.continuous.symbols import KINDS, code, subscript
from lineproof.record import Entry


@dataclass(frozen=True, slots=True)
class Group:
    """Loads of one type that are placed together: on all spans, or live load on one span."""

    kind: str
    span: int

    @property
    def code(self) -> str:
        """Return the group as it stands in ids: D, L2."""
        return f"{code(self.kind)}{self.span or ''}"

    @property
    def subscript(self) -> str:
        """Return the group as a subscript."""
        return f"{subscript(self.kind)}{self.span or ''}"

    def holds(self, kind: str, span: int) -> bool:
        """Tell whether loads of a type on a span belong to it."""
        return kind == self.kind and self.span in (0, span)


def groups_of(model: Model) -> tuple[Group, ...]:
    """Return the groups of a beam's loads."""
    made = [Group(kind, span if kind in LIVE else 0) for kind, span in model.forces.solution.rows]
    return tuple(dict.fromkeys(made))


def moment_name(model: Model, group: Group, span: int, end: End) -> str:
    """Return the symbol of the moment of a group at an end of a span, "" where it is zero."""
    support = near_support(span, end)
    kind = model.inputs.supports[support - 1].kind
    hangs = model.forces.beam.cantilever(span)
    if kind == "free" or not _acts(model, group, support):
        return ""
    if hangs and not is_loaded(model, group, span):
        return ""
    sides = [s for s in (support - 1, support) if 1 <= s <= model.spans]
    side = ("r" if end == "left" else "l") if kind != "simple" and len(sides) > 1 else ""
    return f"M_{support}{side}{group.code}"


def _acts(model: Model, group: Group, support: int) -> bool:
    """Tell whether a group can give a moment at a support."""
    kind = model.inputs.supports[support - 1].kind
    if kind != "simple":
        return True
    sides = [s for s in (support - 1, support) if 1 <= s <= model.spans]
    hung = [s for s in sides if model.forces.beam.cantilever(s)]
    if hung:
        return any(is_loaded(model, group, s) for s in hung)
    return len(sides) > 1


def is_loaded(model: Model, group: Group, span: int) -> bool:
    """Tell whether a group loads a span."""
    return bool(uniform_name(model, group, span)) or bool(single_of(model, group, span))


def uniform_name(model: Model, group: Group, span: int) -> str:
    """Return the symbol of a group's uniform load on a span, "" where there is none."""
    if not group.holds(group.kind, span) or (group.kind, span) not in model.uniform:
        return ""
    return f"w_{code(group.kind)}{span}"


def single_of(model: Model, group: Group, span: int) -> list[SingleLoad]:
    """Return the single loads of a group on a span."""
    return [load for load in model.on_span(span) if group.holds(load.kind, span)]


def where(group: Group) -> str:
    """Say in words what a group loads."""
    return f"{KINDS[group.kind]} on span {group.span}" if group.span else KINDS[group.kind]


def ends_at(model: Model, support: int) -> Iterator[tuple[int, End]]:
    """Give the span ends that meet at a support, from left to right."""
    if support > 1:
        yield support - 1, "right"
    if support <= model.spans:
        yield support, "left"


@lru_cache(maxsize=4096)
def _words(text: str) -> frozenset[str]:
    return frozenset(re.findall(r"[A-Za-z_]\w*", text))


def named(scope: Mapping[str, Entry], text: str) -> dict[str, Any]:
    """Return the entries whose names stand in a formula's text, right of its equals sign."""
    words = _words(text.partition(" = ")[2] or text)
    return {name: entry for name, entry in scope.items() if name in words}
