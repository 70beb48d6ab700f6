"""Which way a rounding errs: what it does to every check that rests on it."""

from __future__ import annotations

from lineproof.audit.effects import UNSEEN
from lineproof.audit.graph import Graph

SIDES = {True: "conservative", False: "not conservative", None: "no check is moved by it"}
"""What is said of the side to which a rounding errs."""


def errs_safely(graph: Graph, entry_id: str, claimed: float, exact: float) -> bool | None:
    """Tell whether a claimed value in place of the exact one errs on the safe side.

    It does not where a check holds that would fail, where a utilisation falls by more than
    :data:`UNSEEN`, or where, with no such change, what falls most falls by more than the most that
    any rises. None says that it errs on no side: no check that rests on the value is moved by it.
    """
    with_claimed = graph.worked({entry_id: claimed}).truths
    with_exact = graph.worked({entry_id: exact}).truths
    falls = rises = 0.0
    for check in graph.checks():
        if check.entry.get("proof"):  # says that two ways of the calc agree, nothing of the beam
            continue
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
    return rises >= falls if rises or falls else None
