"""What a checker writes down about judged claims: findings, sorted by what they matter."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

from lineproof.audit.data import Claim, Effect, Finding, Judged, Severity, Slip, Verdict
from lineproof.audit.effects import effects_of, named_line, turned_sentence
from lineproof.audit.graph import Graph, Node
from lineproof.audit.slips.constants import source_of
from lineproof.audit.slips.scope import stem
from lineproof.audit.slips.search import none_fits
from lineproof.record.entry import LOOKUP
from lineproof.sentences import begun, counted
from lineproof.typeset.values import told

SOURCE = "claims"
FOUND = (
    Verdict.INPUT, Verdict.ORIGIN, Verdict.UNIT, Verdict.DOUBTFUL, Verdict.UNSAFE_ROUNDING,
    Verdict.UNKNOWN,
)  # fmt: skip
"""Verdicts that a checker writes down; what a line carries is told at its origin."""
_MOST_EFFECTS = 300
"""So many findings get their effects; more of them say that the claims are of another beam."""
_BY_CHANCE = 0.03
"""A slip that is no mistake known by name, and less likely than this, fits many a number."""
_KNOWN_BY_CHANCE = 0.1
"""Nor says a mistake known by name much that is less likely than this: of numbers made by two slips
in one line, half of those that it gives as well are met so loosely, of those made by it one in 20
(1200 lines of each, by the slips of the tests)."""
_AS_LIKELY = 0.8
"""So likely beside the first, a second slip is told with it: the first is right in 7 of 10."""
_BY_DIGITS = "mistyped digit"
"""One of five numbers near another is that number with one digit changed: many a slip gives one."""
_CHANCE = "It may fit by chance: see whether two slips were made in this line."
_SMALL = 0.02
"""A check that the right value uses up more by so little is no major matter while it holds."""
_NO_CHECK = "No check of the calc changes by it."
_ORDER = list(Severity)


def findings_of(graph: Graph, judged: Sequence[Judged]) -> tuple[Finding, ...]:
    """Return the findings of judged claims, those that matter most first."""
    carried = _carried(judged)
    found: list[Finding] = []
    for each in judged:
        if each.claim is None or each.verdict not in FOUND:
            continue
        effects: tuple[Effect, ...] = ()
        few, carriers = len(found) < _MOST_EFFECTS, carried.get(each.id, [])
        rightly = _worked_rightly(graph, judged, each.id) if few else []
        advice = _advice(graph, each, rightly)
        if few:
            changed = {each.id: each.claim.value} | {i: graph.stored[i] for i in rightly}
            effects = effects_of(graph, changed)
            turned = turned_sentence(graph, changed)
            if rightly and not carriers:  # written wrongly: a check by itself may compare it so
                effects = tuple(e for e in effects if each.id in graph[e.check].args.values())
                turned, advice = "", f"{advice} {_written_wrongly(graph, rightly)}"
            advice = " ".join(filter(None, (advice, "" if effects else _NO_CHECK, turned)))
        made = _finding(graph, each, each.claim, effects, carriers)
        found.append(replace(made, advice=advice))
    return tuple(sorted(found, key=importance))


def named_clause(clause: str) -> str:
    """Return a clause as a sentence without its stop; what is no clause of a standard is a basis.

    >>> named_clause("11.3.4"), named_clause("statics"), named_clause("")
    ('Clause 11.3.4', 'Basis: statics', '')
    """
    if not clause:
        return ""
    return f"Clause {clause}" if any(c.isdigit() for c in clause) else f"Basis: {clause}"


def importance(finding: Finding) -> tuple[int, int, float]:
    """Return by what findings are sorted: severity, checks that turn, the largest change."""
    turns = sum(e.holds != e.holds_as_claimed for e in finding.effects)
    change = max((abs(_change(e)) for e in finding.effects), default=0.0)
    return _ORDER.index(finding.severity), -turns, -change


def _carried(judged: Sequence[Judged]) -> dict[str, list[str]]:
    """Return by origin, or doubtful line, the ids of the claims that carry it or rest on it."""
    found: dict[str, list[str]] = {}
    for each in judged:
        if each.verdict in (Verdict.CARRIED, Verdict.AGREES):  # others have a finding of their own
            for cause in each.causes:
                found.setdefault(cause, []).append(each.id)
    return found


def _worked_rightly(graph: Graph, judged: Sequence[Judged], entry_id: str) -> list[str]:
    """Return the claimed lines below a wrong one that follow from what it should be, not from it.

    What the wrong value would do to them it has not done: the claim shows it.
    """
    below = set(graph.below([entry_id]))
    return [
        each.id
        for each in judged
        if each.id in below
        and each.claim is not None
        and each.verdict in (Verdict.AGREES, Verdict.CARRIED)
        and entry_id not in each.causes
        and not each.claim.stands_for.meets(each.follows)
    ]


def _written_wrongly(graph: Graph, rightly: Sequence[str]) -> str:
    """Say that a wrong value was written down only, as what was worked from it is right."""
    first, more = graph[rightly[0]], len(rightly) - 1
    named = f"{first.symbol} ({first.label})"
    named += f" and {counted(more, 'more claimed line')}" if more else ""
    follows = "follow" if more else "follows"
    return f"{named} {follows} from what it should be: it was written wrongly and used rightly."


def _finding(
    graph: Graph, judged: Judged, claim: Claim, effects: tuple[Effect, ...], carried: list[str]
) -> Finding:
    node = graph[judged.id]
    what = f"{named_line(graph, judged.id)}: {_words(node, judged, claim)}"
    if carried:
        what += f"; {_resting(judged, len(carried))} it"
    return Finding(
        SOURCE, _severity(judged, effects), what, (judged.id, *carried),
        str(node.entry.get("clause", "")), effects=effects,
    )  # fmt: skip


def _resting(judged: Judged, number: int) -> str:
    if judged.verdict is Verdict.DOUBTFUL:
        return counted(number, "claimed line rests on", "claimed lines rest on")
    return counted(number, "claimed line carries", "claimed lines carry")


def _severity(judged: Judged, effects: Sequence[Effect]) -> Severity:
    """Return how much a finding matters, by what it does to the checks.

    A doubtful line may be no error, so that none is critical.
    """
    if any(e.holds_as_claimed and not e.holds for e in effects):
        return Severity.MAJOR if judged.verdict is Verdict.DOUBTFUL else Severity.CRITICAL
    if judged.verdict in (Verdict.UNSAFE_ROUNDING, Verdict.UNKNOWN):
        return Severity.MINOR
    if any((e.holds and not e.holds_as_claimed) or _change(e) > _SMALL for e in effects):
        return Severity.MAJOR
    no_matter = judged.verdict is Verdict.INPUT and not effects
    return Severity.OBSERVATION if no_matter else Severity.MINOR


def _change(effect: Effect) -> float:
    """Return by how much the right utilisation lies above the claimed one."""
    if effect.right is None or effect.claimed is None:
        return 0.0
    return effect.right - effect.claimed


def _advice(graph: Graph, judged: Judged, rightly: Sequence[str]) -> str:
    """Say what is behind a finding; ``rightly`` are lines that show it to be written wrongly."""
    if judged.verdict is Verdict.DOUBTFUL:
        return "Doubtful, not proved an error: ask which of the two was done."
    if judged.slips:
        return _of_slips(judged.slips, written_wrongly=bool(rightly))
    if judged.verdict is Verdict.ORIGIN:
        return none_fits(graph, judged.id)
    if judged.verdict is Verdict.INPUT:
        return _of_input(graph[judged.id], judged.claim)
    return ""


def _of_slips(slips: Sequence[Slip], *, written_wrongly: bool) -> str:
    """Say which slip gives the value, which one as well as nearly, and whether it may be chance."""
    first, *others = slips
    said = begun(first.sentence)
    if others and others[0].likely >= _AS_LIKELY * first.likely:
        said += f" Nearly as likely: {begun(others[0].sentence)}"
    known = any(cause.usual for cause in first.causes)
    far = first.likely < (_KNOWN_BY_CHANCE if known else _BY_CHANCE)
    by_chance = far or (first.kind == _BY_DIGITS and not known)
    return f"{said} {_CHANCE}" if by_chance and not written_wrongly else said


def _of_input(node: Node, claim: Claim | None) -> str:
    """Say where another input may be from: 0.6 for phi_c is that of A23.3-94."""
    is_read = node.kind == LOOKUP and claim is not None
    source = source_of(stem(node.symbol), claim.value) if claim is not None and is_read else ""
    known = f"{told(claim.typed, claim.unit)} is known from: {source}. " if claim and source else ""
    return f"{known}Settle which input is right, and rework what rests on it."


def _words(node: Node, judged: Judged, claim: Claim) -> str:
    if judged.verdict is Verdict.UNSAFE_ROUNDING:
        return f"{cited(claim)} is {judged.note}"
    if judged.verdict is not Verdict.ORIGIN:
        return f"{cited(claim)} claimed; {judged.note}"
    follows, right = shown(node, judged.follows.middle), shown(node, judged.right)
    said = f"{cited(claim)} does not follow from the values that the claim uses; {follows} does"
    said = said if follows == right else f"{said}, and {right} is right"
    return f"{said}; it {judged.note}" if judged.note else said


def as_typed(claim: Claim) -> str:
    """Return a claimed number with its unit."""
    return told(claim.typed, claim.unit)


def cited(claim: Claim) -> str:
    """Return a claimed number with its unit, its bars, and its place in the other's calculation."""
    return f"{as_typed(claim)}{claim.beside}"


def shown(node: Node, value: float) -> str:
    """Return a value of a line in its printed unit, to four digits."""
    return told(node.number_text(value), node.unit)
