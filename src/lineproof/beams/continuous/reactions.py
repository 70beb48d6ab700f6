"""Reactions by load type, unfactored, for whoever designs what carries the beam; equilibrium."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence

from lineproof.beams.analysis.arrangements import LIVE, Combination, factored_combinations
from lineproof.beams.continuous.case_forces import factor_text
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.groups import (
    Group,
    ends_at,
    moment_name,
    named,
    single_of,
    uniform_name,
    where,
)
from lineproof.beams.continuous.model import ANALYSIS, Model, SingleLoad
from lineproof.beams.continuous.symbols import KINDS, code, required, stated, subscript
from lineproof.formula.grammar import LONGEST
from lineproof.record import Entry
from lineproof.sheet import Sheet

Scopes = Mapping[Group, Mapping[str, Entry]]

UPLIFT = (
    "The least reaction of support {support} is negative: the beam lifts off unless it is held "
    "down. Tie it to the support for this force, or weigh it down; that tie is not checked here."
)
_LIFTS = "uplift-"
PIECE = 12
"""Terms of a sum in one line, where all are too many for one."""


def record_reactions(model: Model, scopes: Scopes) -> None:
    """Record inside the open part every support's reaction by group, then sums and equilibrium.

    For live load the largest reaction has it on those spans only that raise it, the smallest on
    those that lower it. The least factored reaction of a support is that of all load types.
    """
    supports = model.inputs.held
    for group, scope in scopes.items():
        made = {j: _reaction(model, group, scope, j) for j in supports}
        _check_equilibrium(model, group, scope, [e for e in made.values() if e is not None])
    kinds = tuple(dict.fromkeys(group.kind for group in scopes))
    for kind in (kind for kind in kinds if kind in LIVE):
        for j in supports:
            _largest(model, kind, scopes, j)
            _smallest(model, kind, scopes, j)
    for j in supports:
        _least(model, kinds, j)


def _reaction(model: Model, group: Group, scope: Mapping[str, Entry], support: int) -> Entry | None:
    """Record the reaction of a support due to one group, from the statics of its spans."""
    terms = [t for span, end in ends_at(model, support) for t in end_shear(model, group, span, end)]
    if not terms:
        return None
    title = f"Reaction of support {support}, {where(group)}, unfactored"
    text = f"R_{support}{group.code} = {' + '.join(terms)}".replace("+ -", "- ")
    return model.sheet.line(stated(text, title=title), **named(scope, text))


def end_shear(model: Model, group: Group, span: int, end: End) -> list[str]:
    """Return the terms of the upward force on a span at an end of it, due to one group."""
    far: End = "right" if end == "left" else "left"
    uniform, single = uniform_name(model, group, span), single_of(model, group, span)
    if model.forces.beam.cantilever(span):
        terms = [f"{uniform}*l_{span}"] if uniform else []
        return terms + [_size(load) for load in single]
    terms = [f"{uniform}*l_{span}/2"] if uniform else []
    terms += [f"{_size(load)}*{_arm(load, span, end)}/l_{span}" for load in single]
    own, other = moment_name(model, group, span, end), moment_name(model, group, span, far)
    if own and other:
        terms.append(f"({other} - {own})/l_{span}")
    elif own or other:
        terms.append(f"{other}/l_{span}" if other else f"-{own}/l_{span}")
    return terms


def _size(load: SingleLoad) -> str:
    n = load.number
    return f"P_x{n}" if load.at is not None else f"w_x{n}*(e_x{n} - s_x{n})"


def _arm(load: SingleLoad, span: int, end: End) -> str:
    """Return the distance of a load from the other end of its span."""
    n = load.number
    at = f"a_x{n}" if load.at is not None else f"(s_x{n} + e_x{n})/2"
    return f"(l_{span} - {at})" if end == "left" else at if load.at is not None else f"({at})"


def _check_equilibrium(
    model: Model, group: Group, scope: Mapping[str, Entry], reactions: Sequence[Entry]
) -> None:
    """Record that the reactions of a group balance its loads."""
    loads = []
    for span in range(1, model.spans + 1):
        uniform = uniform_name(model, group, span)
        loads += [f"{uniform}*l_{span}"] if uniform else []
        loads += [_size(load) for load in single_of(model, group, span)]
    total = " + ".join(loads)
    up = " + ".join(r.symbol for r in reactions)
    bound = named(scope, total)
    if len(_equilibrium(up, total)) > LONGEST:
        up = _summed(model, f"R_p{{}}{group.code}", up, f"Reactions, {where(group)}", {})
        total = _summed(model, f"W_p{{}}{group.code}", total, f"Loads, {where(group)}", bound)
        bound = {}
    test = required(
        _equilibrium(up, total), "kN", title=f"Equilibrium, {where(group)}",
        yes="The reactions balance the loads.", key=f"equilibrium-{group.code}",
    )  # fmt: skip
    model.sheet.check(test, **bound)


def _equilibrium(up: str, total: str) -> str:
    return f"abs({up} - ({total})) <= 0.001*({total})"


def _summed(model: Model, symbol: str, total: str, title: str, scope: Mapping[str, Entry]) -> str:
    """Record a long sum in pieces, each a line; return the sum of the pieces."""
    pieces = []
    for number, terms in enumerate(_batched(total.split(" + "), PIECE), 1):
        text = f"{symbol.format(number)} = {' + '.join(terms)}"
        model.sheet.line(stated(text, title=f"{title}, sum {number}"), **named(scope, text))
        pieces.append(symbol.format(number))
    return " + ".join(pieces)


def _batched(items: Sequence[str], size: int) -> Iterator[Sequence[str]]:
    """Give the items in runs of at most ``size``."""
    for start in range(0, len(items), size):
        yield items[start : start + size]


def _largest(model: Model, kind: str, scopes: Scopes, support: int) -> None:
    """Record the largest reaction of live load, on the spans that raise it."""
    raising = _of_kind(model, kind, scopes, support, 1.0)
    if raising:
        title = (
            f"Largest reaction of support {support}, {KINDS[kind]} where it raises it, unfactored"
        )
        model.sheet.line(stated(f"R_{support}{code(kind)} = {' + '.join(raising)}", title=title))


def _smallest(model: Model, kind: str, scopes: Scopes, support: int) -> None:
    """Record the smallest reaction of live load, where it lowers it."""
    lowering = _of_kind(model, kind, scopes, support, -1.0)
    if lowering:
        title = (
            f"Smallest reaction of support {support}, {KINDS[kind]} where it lowers it, unfactored"
        )
        text = f"R_m{support}{code(kind)} = {' + '.join(lowering)}"
        model.sheet.line(stated(text, title=title))


def _least(model: Model, kinds: Sequence[str], support: int) -> None:
    """Record the least factored reaction where anything lowers it, and whether the beam lifts off.

    A load that lowers it has its largest factor: dead load that does so is no counterweight.
    """
    sheet, entries = model.sheet, model.sheet.part_entries
    names = {kind: f"R_{'m' if kind in LIVE else ''}{support}{code(kind)}" for kind in kinds}
    values = {kind: entries[name].value for kind, name in names.items() if name in entries}
    if not any(value < 0 for value in values.values()):
        return

    def sum_of(each: Combination) -> float:
        return float(sum(f * values.get(kind, 0.0) for kind, f in each.factors))

    least = min(factored_combinations(kinds), key=sum_of)
    terms = [(kind, factor_text(f)) for kind, f in least.factors if kind in values]
    what = " + ".join(f"{factor}{subscript(kind)}" for kind, factor in terms)
    text = " + ".join(f"{factor}*{names[kind]}" for kind, factor in terms)
    made = sheet.line(
        stated(
            f"R_u{support} = {text}", clause="NBC 4.1.3.2",
            title=f"Least factored reaction of support {support}: {what}",
        )
    )  # fmt: skip
    if made.value < 0:
        note_uplift(sheet, support)


def note_uplift(sheet: Sheet, support: int) -> None:
    """Record inside the open part of the analysis that the beam lifts off a support."""
    sheet.note(f"{_LIFTS}{support}", UPLIFT.format(support=support), title="Uplift")


def ties_not_covered(sheet: Sheet) -> list[Mapping[str, str]]:
    """Return what the analysis as it stands leaves uncovered: ties where the beam lifts off."""
    entries = next((part.entries for part in sheet.parts if part.key == ANALYSIS), {})
    notes = (key for key in entries if key.startswith(_LIFTS))
    return [
        {
            "check": f"Tie that holds the beam down at support {key.removeprefix(_LIFTS)}, which "
            "it lifts off without",
            "clause": "NBC 4.1.3.2",
        }
        for key in notes
    ]


def _of_kind(model: Model, kind: str, scopes: Scopes, support: int, sign: float) -> list[str]:
    """Return the reactions of a support by live load on single spans that have a sign."""
    entries = model.sheet.part_entries
    names = [f"R_{support}{group.code}" for group in scopes if group.kind == kind]
    return [name for name in names if name in entries and sign * entries[name].value > 0]
