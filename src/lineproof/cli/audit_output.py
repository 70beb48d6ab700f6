"""An audit as text for the terminal and as plain data."""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Iterator
from typing import Any

from lineproof.audit.data import Audit, Effect, Finding, Judged, Severity, Slip, Verdict
from lineproof.audit.findings import as_typed, cited, shown
from lineproof.audit.graph import Graph, Node
from lineproof.audit.shared import shared_slips
from lineproof.quantity.units import internal_factor
from lineproof.sentences import begun, counted
from lineproof.typeset import printable

MOST_EFFECTS = 5
MOST_SLIPS = 3
_COUNTED = (
    (Verdict.AGREES, "agrees", "agree"),
    (Verdict.OTHER_METHOD, "follows by another valid method", "follow by another valid method"),
    (Verdict.SAFE_ROUNDING, "is rounded conservatively", "are rounded conservatively"),
    (Verdict.INPUT, "is another input", "are other inputs"),
    (Verdict.ORIGIN, "is the origin of an error", "are origins of errors"),
    (Verdict.CARRIED, "carries an error", "carry an error"),
    (Verdict.UNIT, "is a slip of units", "are slips of units"),
    (Verdict.DOUBTFUL, "is doubtful", "are doubtful"),
    (Verdict.UNSAFE_ROUNDING, "is rounded unconservatively", "are rounded unconservatively"),
    (Verdict.UNKNOWN, "cannot be judged", "cannot be judged"),
)
_REMARKED = (Verdict.OTHER_METHOD, Verdict.SAFE_ROUNDING)
"""Verdicts that are no findings, but of which a checker wants to read."""


def as_text(audit: Audit, graph: Graph | None) -> list[str]:
    """Return counts, findings by severity, and remarks, a line each; no graph: of code alone."""
    return [printable(line).rstrip() for line in _lines(audit, graph)]


def _lines(audit: Audit, graph: Graph | None) -> Iterator[str]:
    if graph is None:
        yield audit.calc
    else:
        title = graph.record.data["calc"].get("title", "")
        yield f"{audit.calc}  {title}  digest {audit.digest}"
    if audit.judged:
        yield _counts(audit)
    yield from (f"note: {note}" for note in audit.notes)
    findings = audit.findings
    yield counted(len(findings), "finding") if findings else "no findings"
    yield from shared_slips(audit)
    number = 0
    for severity in Severity:
        group = [finding for finding in findings if finding.severity is severity]
        if group:
            yield ""
            yield f"{severity}"
        for finding in group:
            number += 1
            yield from _finding(number, finding)
    if graph is not None:
        yield from _remarks(audit, graph)


def _counts(audit: Audit) -> str:
    counts = Counter(judged.verdict for judged in audit.judged)
    claimed = sum(judged.claim is not None for judged in audit.judged)
    told = [counted(counts[v], one, many) for v, one, many in _COUNTED if counts[v]]
    left = counted(counts[Verdict.NOT_CLAIMED], "line")
    return f"{counted(claimed, 'claim')}: {', '.join(told)}; {left} not claimed"


def _finding(number: int, finding: Finding) -> Iterator[str]:
    clause = f" [{finding.clause}]" if finding.clause else ""
    told = not finding.ids or finding.ids[0] in finding.what
    place = "" if told else f"{finding.ids[0]}: "
    yield f"{number:4}  {place}{finding.what}{clause}"
    if finding.advice:
        yield f"      {begun(finding.advice)}"
    for effect in finding.effects[:MOST_EFFECTS]:
        yield f"      - {effect.sentence}"
    if len(finding.effects) > MOST_EFFECTS:
        yield f"      - and {counted(len(finding.effects) - MOST_EFFECTS, 'check')} more"


def _remarks(audit: Audit, graph: Graph) -> Iterator[str]:
    remarked = [judged for judged in audit.judged if judged.verdict in _REMARKED]
    if remarked:
        yield ""
        yield "no errors"
    for judged in remarked:
        node = graph[judged.id]
        claim = cited(judged.claim) if judged.claim is not None else ""
        yield f"      {judged.id} ({node.label}): {claim} claimed; {judged.note}"


def as_data(audit: Audit, graph: Graph | None) -> dict[str, Any]:
    """Return an audit as plain data.

    It holds ``calc``, ``digest``, ``counts``, ``judged``, ``findings``, ``shared`` (sentences on
    slips that several findings have in common) and ``notes``.

    Values of a judged line stand in ``unit``, the unit in which the line prints; one that is no
    finite number is none.
    """
    counts = Counter(str(judged.verdict) for judged in audit.judged)
    claimed = [j for j in audit.judged if j.claim is not None]
    return {
        "calc": audit.calc,
        "digest": audit.digest,
        "counts": dict(sorted(counts.items())),
        "judged": [] if graph is None else [_judged(j, graph[j.id]) for j in claimed],
        "findings": [_finding_data(finding) for finding in audit.findings],
        "shared": list(shared_slips(audit)),
        "notes": list(audit.notes),
    }


def _judged(judged: Judged, node: Node) -> dict[str, Any]:
    claim, factor = judged.claim, internal_factor(node.unit)
    return {
        "id": judged.id,
        "label": node.label,
        "title": node.title,
        "verdict": str(judged.verdict),
        "claimed": as_typed(claim) if claim is not None else "",
        "row": claim.row if claim is not None else 0,
        "where": claim.where if claim is not None else "",
        "unit": node.unit,
        "follows": [_finite(end / factor) for end in (judged.follows.low, judged.follows.high)],
        "right": _finite(judged.right / factor),
        "shown": shown(node, judged.right),
        "note": judged.note,
        "slips": [_slip(slip, factor) for slip in judged.slips[:MOST_SLIPS]],
        "causes": list(judged.causes),
    }


def _slip(slip: Slip, factor: float) -> dict[str, Any]:
    return {"kind": slip.kind, "sentence": slip.sentence, "value": _finite(slip.value / factor)}


def _finite(value: float | None) -> float | None:
    """Return a number as JSON may hold it: none for what absurd claims lead to."""
    return value if value is not None and math.isfinite(value) else None


def _finding_data(finding: Finding) -> dict[str, Any]:
    return {
        "source": finding.source,
        "severity": str(finding.severity),
        "what": finding.what,
        "ids": list(finding.ids),
        "clause": finding.clause,
        "advice": finding.advice,
        "effects": [_effect(effect) for effect in finding.effects],
    }


def _effect(effect: Effect) -> dict[str, Any]:
    return {
        "check": effect.check,
        "claimed": _finite(effect.claimed),
        "right": _finite(effect.right),
        "holds_as_claimed": effect.holds_as_claimed,
        "holds": effect.holds,
        "sentence": effect.sentence,
    }
