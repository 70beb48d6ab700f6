"""What matters: the checks that other values of some lines would change, the gravest first."""

from __future__ import annotations

import math
import re
from collections.abc import Container, Mapping
from dataclasses import dataclass

import lineproof.beams  # noqa: F401 - registers the procedures of found values
from lineproof.audit.data import Effect
from lineproof.audit.graph import Graph, Node, Truth
from lineproof.record.entry import DECISION
from lineproof.sentences import begun

UNSEEN = 0.0005
"""A change of utilisation up to this is none: it would print as the same number."""
_DIGITS = (2, 3, 4, 6)
_MOST_TURNED = 2
"""So many decisions that turn are named in a sentence; the others are counted."""
_PLACE = re.compile(r"\b(?:span|support)s? \d.*", re.IGNORECASE)


@dataclass(frozen=True, slots=True)
class Told:
    """How the two states of a check are called, in the order in which the sentence tells them.

    ``claimed_first`` tells the state with the claimed values first; the state told last is the
    one that matters, and the effects are sorted by it. ``record_is_right`` tells that the record
    holds the right values, so that it is worked again with those claimed; else with the right ones.
    """

    claimed: str
    right: str
    claimed_first: bool = True
    record_is_right: bool = True

    @property
    def changed(self) -> str:
        """How the state is called that the record has once it is worked with other values."""
        return self.claimed if self.record_is_right else self.right


CLAIMED = Told("as claimed", "with the right value")
"""Somebody's values against the record's: what is true once they are put right."""
DRAWN = Told("as drawn", "in the calc", claimed_first=False)
"""Values of a drawing against the calc's: what is true of the beam that will be built."""
RECORDED = Told("as recorded", "put right", record_is_right=False)
"""Values of the record against those that it should have."""


def effects_of(
    graph: Graph, changed: Mapping[str, float], told: Told = CLAIMED
) -> tuple[Effect, ...]:
    """Return what changed values do to every check that rests on them.

    ``changed`` holds values by id in internal units, as they were claimed (or drawn). An effect
    keeps both numbers: ``claimed`` with these values, everything below them worked again, and
    ``right`` as recorded. A check stands here if its truth differs or its utilisation by more
    than :data:`UNSEEN`; one that only proves the calc by a second path does not. Checks that turn
    to fail come first, then those that turn to hold, then the rest by their change of utilisation.
    """
    return _effects(graph, changed, told)


def effects_of_right(graph: Graph, right: Mapping[str, float]) -> tuple[Effect, ...]:
    """Return the same where the record itself is wrong: ``right`` holds what its lines should be.

    ``claimed`` of an effect is as recorded, ``right`` with these values put in.
    """
    return _effects(graph, right, RECORDED)


def _effects(graph: Graph, changed: Mapping[str, float], told: Told) -> tuple[Effect, ...]:
    worked, titles = graph.worked(changed), _titles(graph)
    found = []
    for node in graph.checks():
        if node.entry.get("proof"):  # says that two ways of the calc agree, nothing of the beam
            continue
        if node.id not in worked.truths and node.id not in worked.failed:
            continue
        other, recorded = worked.truths.get(node.id), graph.truth(node.id)
        claimed, right = (other, recorded) if told.record_is_right else (recorded, other)
        found.append(_effect(claimed, right, told, node.id, _name(node, titles)))
    return tuple(sorted(filter(_matters, found), key=lambda effect: _order(effect, told)))


def turned_decisions(graph: Graph, changed: Mapping[str, float]) -> tuple[str, ...]:
    """Return the ids of decisions that changed values turn: the lines after them would differ.

    The effects behind such a decision are those of the recorded branch.
    """
    truths = graph.worked(changed).truths
    return tuple(
        node.id
        for node in graph
        if node.kind == DECISION
        and node.id in truths
        and truths[node.id].holds != graph.truth(node.id).holds
    )


def turned_sentence(
    graph: Graph,
    changed: Mapping[str, float],
    told: Told = CLAIMED,
    parts: Container[str] | None = None,
) -> str:
    """Return the sentence on decisions that changed values turn; nothing where none does.

    ``parts`` are those in which the values are changed; without them it is the whole calc.

    The calc holds the lines of the branch taken alone, so that no effect of the other is known.
    """
    nodes = (graph[i] for i in turned_decisions(graph, changed))
    turned = [node for node in nodes if parts is None or node.part in parts]
    if not turned:
        return ""
    titles = _titles(graph)
    said = [_turn(node, titles) for node in turned[:_MOST_TURNED]]
    more = len(turned) - _MOST_TURNED
    said += [f"and {more} more"] if more > 0 else []
    what = "a decision" if len(turned) == 1 else f"{len(turned)} decisions"
    return (
        f"{begun(told.changed)}, {what} of the calc would turn: {'; '.join(said)}. "
        "Effects are told along the recorded branch only; the lines of the other are not in the "
        "calc."
    )


def _turn(node: Node, titles: Mapping[str, str]) -> str:
    state = "would not hold" if node.entry["holds"] else "would hold"
    conclusion = str(node.entry.get("conclusion", ""))
    recorded = f' (recorded: "{conclusion}")' if conclusion else ""
    return f"{_name(node, titles)}, where {node.entry['formula']} {state}{recorded}"


def place_of(title: str) -> str:
    """Return the place that the title of a part names.

    >>> place_of("Span 2: positive moment"), place_of("Shear of span 1 at its left support")
    ('span 2', 'span 1 at its left support')
    >>> place_of("Cover for durability and fire")
    'cover for durability and fire'
    """
    head = title.split(":", maxsplit=1)[0]
    found = _PLACE.search(head)
    place = found.group() if found else title
    return place[:1].lower() + place[1:]


def named_line(graph: Graph, entry_id: str) -> str:
    """Name a line as a checker does: its title, its place and its number on the page."""
    return _name(graph[entry_id], _titles(graph))


def _titles(graph: Graph) -> dict[str, str]:
    return {part["key"]: part["title"] for part in graph.record.parts}


def _name(node: Node, titles: Mapping[str, str]) -> str:
    label = f" ({node.label})" if node.label else ""
    name = node.title or str(node.entry.get("symbol", "")) or node.id
    return f"{name}, {place_of(titles[node.part])}{label}"


def _effect(
    claimed: Truth | None, right: Truth | None, told: Told, check: str, name: str
) -> Effect:
    """Put the two states of a check side by side; one that cannot be worked is None."""
    states = _state(told.claimed, claimed), _state(told.right, right)
    first, last = states if told.claimed_first else states[::-1]
    lost = [
        state.called for state, truth in zip(states, (claimed, right), strict=True) if not truth
    ]
    said = f"cannot be worked {lost[0]}" if lost else _said(first, last)
    return Effect(
        check,
        states[0].utilisation,
        states[1].utilisation,
        states[0].holds,
        states[1].holds,
        f"{name}: {said}",
    )


def _state(called: str, truth: Truth | None) -> _State:
    if truth is None:
        return _State(called, None, holds=False)
    return _State(called, truth.utilisation, truth.holds)


@dataclass(frozen=True, slots=True)
class _State:
    """A check under one set of values."""

    called: str
    utilisation: float | None
    holds: bool


def _said(first: _State, last: _State) -> str:
    turn = {
        (True, False): "no longer holds",
        (False, True): "holds after all",
        (True, True): "still holds",
        (False, False): "does not hold either way",
    }[first.holds, last.holds]
    before, after = _digits(first.utilisation, last.utilisation)
    return f"utilisation from {before} {first.called} to {after} {last.called}, {turn}"


def _digits(first: float | None, last: float | None) -> tuple[str, str]:
    """Print two utilisations with so many decimals that they differ and 1.004 is not 1.00."""
    texts = ("", "")
    for count in _DIGITS:
        texts = (_printed(first, count), _printed(last, count))
        hidden = any(
            value is not None and float(text) == 1 != value
            for text, value in zip(texts, (first, last), strict=True)
        )
        if texts[0] != texts[1] and not hidden:
            break
    return texts


def _printed(utilisation: float | None, decimals: int) -> str:
    return "none" if utilisation is None else f"{utilisation:.{decimals}f}"


def _matters(effect: Effect) -> bool:
    return effect.holds != effect.holds_as_claimed or _change(effect) > UNSEEN


def _change(effect: Effect) -> float:
    if effect.claimed is None or effect.right is None:
        return 0.0 if effect.claimed == effect.right else math.inf
    return abs(effect.right - effect.claimed)


def _order(effect: Effect, told: Told) -> tuple[int, float]:
    last = effect.holds if told.claimed_first else effect.holds_as_claimed
    turns = effect.holds != effect.holds_as_claimed
    return (0 if turns and not last else 1 if turns else 2), -_change(effect)
