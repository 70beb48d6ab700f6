"""What speaks against a slip above a claim: another claimed line would show it, and is right."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from lineproof.audit.data import Interval
from lineproof.audit.graph import real
from lineproof.audit.slips.scope import Pairs, Scope
from lineproof.errors import UserError
from lineproof.formula.compiled import NOT_COMPUTED

CLEARLY = 2.0
"""A line would show a slip where it moves it so many half widths away from what is claimed."""
_SAME = 1e-9


@dataclass(frozen=True)
class Witnesses:
    """The claimed lines of one table, asked whether a line above them was worked out wrongly."""

    scope: Scope
    pairs: Pairs
    used: Mapping[str, Interval]
    claimed: Mapping[str, str]
    kept: dict[tuple[str, str, float], str] = field(default_factory=dict)

    def against(self, target: str, changed: str, value: float) -> str:
        """Return a claimed line that is right and would not be with this value; "" for none.

        ``target`` is the claim to be explained. The value is carried on through lines that nobody
        claimed: from a claimed one on, what was written down counts.
        """
        key = target, changed, value
        if key not in self.kept:
            self.kept[key] = self._witness(*key)
        return self.kept[key]

    def _witness(self, target: str, changed: str, value: float) -> str:
        now = {changed: value}
        for entry_id in self.scope.graph.below([changed]):
            node = self.scope.graph[entry_id]
            if entry_id not in self.scope.units or now.keys().isdisjoint(node.args.values()):
                continue
            named = {
                name: now[i] if i in now else self.pairs[i][0]
                for name, i in node.args.items()
                if i in self.scope.units
            }
            try:
                made = real(node.compute(named))
            except (*NOT_COMPUTED, UserError):
                continue
            if entry_id not in self.claimed:
                now[entry_id] = made
            elif entry_id != target and self._shows(entry_id, made):
                return entry_id
        return ""

    def _shows(self, entry_id: str, made: float) -> bool:
        """Tell whether a line is right as claimed, and clearly not what the slip would make it."""
        stands_for = self.used.get(entry_id)
        right = self.scope.graph.stored[entry_id]
        if stands_for is None or not stands_for.holds(right):
            return False
        room = CLEARLY * stands_for.half + _SAME * abs(right)
        return abs(made - stands_for.middle) > room
