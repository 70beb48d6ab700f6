"""The usual traps of a concrete beam, each a rule on the record: found where a line fell in."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

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
SLIP = "slip: "
COVERED_BY: Mapping[tuple[int, str], str] = {
    (6, "moment in kN.m with shear in N"): f"{SLIP}unit factor",
    (30, "kPa used as kN/m"): f"{SLIP}unit factor",
    (30, "half or full tributary width in a claim"): f"{SLIP}half or full tributary width",
    (30, "clear for centre span in a claim"): f"{SLIP}clear for centre span",
    (30, "simple span for continuous in a claim"): f"{SLIP}simple span for continuous",
    (30, "moment at the axis in a claim"): f"{SLIP}centreline for face",
    (30, "supports swapped in a claim"): f"{SLIP}left for right, or neighbouring place",
    (30, "factored for specified in a claim"): f"{SLIP}factored for service",
    (31, "one leg of the stirrups in a claim"): f"{SLIP}stirrup legs",
    (31, "number of bars and their area in a claim"): f"{SLIP}bar count changed but not the area",
    (31, "length of a cantilever in a claim"): f"{SLIP}clear for centre span",
    (31, "calc and drawing at different revisions"): "drawing",
    (28, "checks that another standard asks for, and this one too"): "missing",
}
"""Parts of traps that do not show in a record alone: the search that finds them.

They show in the claims of another (``slip:`` and the kind that the slip finder tells), in a
drawing, or in what is missing.
"""


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
