"""Analysis on the sheet: support moments and reactions by load type, as specified.

Everything that follows - cases, shears, moments in the spans - is a sum of these or statics, line
by line.
"""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.continuous.forces import ENDS
from lineproof.beams.continuous.groups import Group, groups_of, moment_name
from lineproof.beams.continuous.model import ANALYSIS, Model, near_support
from lineproof.beams.continuous.reactions import record_reactions
from lineproof.beams.continuous.support_moments import SupportMoments
from lineproof.beams.continuous.support_turning import record_support_moments, symbols_of_moments
from lineproof.beams.continuous.symbols import KINDS, code, notation, numbered, subscript
from lineproof.formula import Symbol

_SIGNS = (
    "Moments are positive where the bottom is in tension; loads act downward, reactions upward. "
    "Each row of support moments belongs to one load type as specified (not factored): dead load "
    "and snow on all spans, live load on one span at a time; every case is a sum of these rows. In "
    "checks and deflections a moment is entered by its size, and its title says which sign it has."
)
_SAME = "The bending stiffness is taken the same in all spans, so it cancels."
_GROSS = "Bending stiffness of the gross sections of the spans, with one modulus of elasticity."


def record_analysis(model: Model) -> None:
    """Record the part of the analysis: support moments by group, reactions, equilibrium."""
    sheet = model.sheet
    sheet.notation = sheet.notation | notation((*_inertias(model), *_symbols(model)))
    with sheet.part(ANALYSIS, "Analysis: moments at the supports by load type"):
        sheet.note("signs", _SIGNS, title="Signs")
        sheet.note("cases", _cases_text(model), title="Load cases", clause="NBC 4.1.3.2")
        sheet.note(
            "stiffness", _GROSS if model.inertias else _SAME, title="Stiffness",
            clause="9.2.1", basis="common practice",
        )  # fmt: skip
        scopes = {}
        for group in groups_of(model):
            moments = SupportMoments(model, group)
            moments.record()
            scopes[group] = moments.scope
        record_reactions(model, scopes)
        record_support_moments(model, scopes)


def _cases_text(model: Model) -> str:
    """List the combinations and the placements of live load that make the load cases."""
    cases = model.forces.cases
    factored = dict.fromkeys(case.combination for case in cases)
    placed = dict.fromkeys(case.arrangement for case in cases if case.arrangement)
    made = f"{len(cases)} load cases. Combinations: {'; '.join(factored)}."
    if placed:
        made += f" Placements, with every combination of live load: {'; '.join(placed)}."
    return made


def _inertias(model: Model) -> Iterator[Symbol]:
    for span in range(1, len(model.inertias) + 1):
        meaning = f"moment of inertia of span {span}, gross section"
        yield numbered(f"I_{span}", "I", str(span), meaning)


def _symbols(model: Model) -> Iterator[Symbol]:
    for group in groups_of(model):
        words = f"live load on span {group.span}" if group.span else KINDS[group.kind]
        for span in range(1, model.spans + 1):
            yield from _symbols_of_span(model, group, span, words)
        for support in range(1, model.spans + 2):
            yield from _symbols_of_reaction(group, support, words)
    yield from symbols_of_moments(model, groups_of(model))
    for support in range(1, model.spans + 2):
        what = f"least factored reaction of support {support}"
        yield numbered(f"R_u{support}", "R", f"u,{support}", what)


def _symbols_of_span(model: Model, group: Group, span: int, words: str) -> Iterator[Symbol]:
    """Give the moments at the ends of a span, and the slopes there if it is simply supported."""
    for end in ENDS:
        name, support = moment_name(model, group, span, end), near_support(span, end)
        if name:
            side = {"l": "ℓ", "r": "r"}.get(name[2 + len(str(support))], "")
            of = {"ℓ": ", on its left", "r": ", on its right"}.get(side, "")
            meaning = f"moment at support {support}{of}, {words}"
            yield numbered(name, "M", f"{support}{side},{group.subscript}", meaning)
    for letter, end in zip("ab", ENDS, strict=True):
        meaning = f"slope at the {end} end of span {span}, simply supported, times EI, {words}"
        sub = f"{span}{letter},{group.subscript}"
        yield numbered(f"F_{span}{letter}{group.code}", "F", sub, meaning)


def _symbols_of_reaction(group: Group, support: int, words: str) -> Iterator[Symbol]:
    sub, of_kind = f"{support},{subscript(group.kind)}", code(group.kind)
    meaning = f"reaction of support {support}, {KINDS[group.kind]}, unfactored"
    yield numbered(f"R_{support}{of_kind}", "R", sub, meaning)
    if group.kind in LIVE:
        meaning = f"smallest reaction of support {support}, {KINDS[group.kind]}"
        yield numbered(f"R_m{support}{of_kind}", "R", f"m,{sub}", meaning)
    if group.span:
        meaning = f"reaction of support {support}, {words}, unfactored"
        yield numbered(f"R_{support}{group.code}", "R", f"{support},{group.subscript}", meaning)
