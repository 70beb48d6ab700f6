"""Which way a rounding errs: what it does to every check that rests on it."""

from __future__ import annotations

from lineproof.audit.effects import UNSEEN
from lineproof.audit.graph import Graph


def is_safe(graph: Graph, entry_id: str, claimed: float, exact: float) -> bool:
    """Tell whether a claimed value in place of the exact one errs on the safe side.

    It does not where a check holds that would fail, where a utilisation falls by more than
    :data:`UNSEEN`, or where, with no such change, what falls most falls by more than the most that
    any rises. A value on which no check rests errs on no side and counts as safe.
    """
    with_claimed = graph.worked({entry_id: claimed}).truths
    with_exact = graph.worked({entry_id: exact}).truths
    falls = rises = 0.0
    for check in graph.checks():
        before, after = with_exact.get(check.id), with_claimed.get(check.id)
        if before is None or after is None:
            continue
        if after.holds and not before.holds:
            return False
        if before.utilisation is None or after.utilisation is None:
            continue
        change = after.utilisation - before.utilisation
        if change < -UNSEEN:
            return False
        part = change / abs(before.utilisation) if before.utilisation else 0.0
        falls, rises = max(falls, -part), max(rises, part)
    return rises >= falls
