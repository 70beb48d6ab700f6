"""The usual traps of a concrete beam, each a rule on the record: found where a line fell in."""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.audit.data import Effect, Finding, Severity
from lineproof.audit.effects import RECORDED, effects_of_right, turned_sentence
from lineproof.audit.search import (
    traps_calc,
    traps_laid,
    traps_loads,
    traps_section,
    traps_service,
    traps_shear,
    traps_stirrups,
)
from lineproof.audit.search.traps_view import Caught, Remark, Trap, View
from lineproof.record import Record

SOURCE = "traps"
TRAPS: tuple[Trap, ...] = tuple(
    sorted(
        (
            *traps_section.TRAPS,
            *traps_shear.TRAPS,
            *traps_stirrups.TRAPS,
            *traps_loads.TRAPS,
            *traps_calc.TRAPS,
            *traps_service.TRAPS,
            *traps_laid.TRAPS,
        ),
        key=lambda trap: trap.number,
    )
)
"""Every rule, by the number of its trap."""


def trap_findings(record: Record) -> tuple[Finding, ...]:
    """Return a finding for every line that fell into a trap, in the order of the traps.

    Where the right value of the line is known, the finding holds its effects, and it is critical
    if a check that is recorded as holding would no longer hold.
    """
    return tuple(finding for _, finding in traps_met(record))


def traps_met(record: Record) -> Iterator[tuple[Trap, Finding]]:
    """Give every finding with the rule that found it."""
    view = View(record)
    for trap in TRAPS:
        for caught in trap.look(view):
            yield trap, _finding(view, caught)


def _finding(view: View, caught: Caught | Remark) -> Finding:
    if isinstance(caught, Remark):
        return Finding(
            SOURCE, caught.severity, f"{caught.what}.", caught.ids, caught.clause, caught.advice
        )
    effects = effects_of_right(view.graph, caught.right) if caught.right else ()
    turned = turned_sentence(view.graph, caught.right, RECORDED) if caught.right else ""
    return Finding(
        SOURCE,
        _severity(caught.severity, effects),
        f"{view.name(caught.node)}: {caught.what}.",
        (caught.node.id,),
        caught.clause or str(caught.node.entry.get("clause", "")),
        f"{caught.advice} {turned}".strip(),
        effects,
    )


def _severity(base: Severity, effects: tuple[Effect, ...]) -> Severity:
    turned = any(effect.holds_as_claimed and not effect.holds for effect in effects)
    return Severity.CRITICAL if turned else base
