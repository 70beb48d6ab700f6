"""The largest factored reaction of a support as lines, after redistribution too."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from lineproof.beams.continuous.bearing import largest_reaction
from lineproof.beams.continuous.case_forces import factor_text
from lineproof.beams.continuous.forces import End, other
from lineproof.beams.continuous.groups import Group, ends_at, groups_of, moment_name, named
from lineproof.beams.continuous.model import ANALYSIS, GIVEN, Model, near_support
from lineproof.beams.continuous.symbols import notation, numbered, stated
from lineproof.beams.steps import Steps
from lineproof.record import Entry

_ADDED = "M_f/l"
"""What an assumed moment of restraint adds to the reaction of its support."""


def record_reaction(steps: Steps, model: Model, support: int, *, restrained: bool) -> Entry:
    """Record the largest factored reaction of a support inside the open part, and bind it.

    With ``restrained``, what the assumed moment of restraint adds is counted.
    """
    row, R = largest_reaction(model.forces, support)
    sheet, case = steps.sheet, model.forces.cases[row]
    held = _restraint_at(model, support) if restrained else {}
    if model.inputs.forces_file is not None:
        return _given_reaction(steps, R, f"frame analysis, {case}", held)
    entries = sheet.entries_of(ANALYSIS)
    factors = model.forces.factors_of(row)
    terms: list[str] = []
    bound: dict[str, Any] = {}
    for group in groups_of(model):
        name = f"R_{support}{group.code}"
        factor = _factor(factors, group)
        if factor and name in entries:
            bound[name] = entries[name]
            terms.append(f"{factor_text(factor)}*{name}")
    terms += _redistributed(steps, model, support, row, bound)
    if held:
        bound |= held
        terms.append(_ADDED)
    text = f"R_f = {' + '.join(terms)}".replace("+ -", "- ")
    made = sheet.line(stated(text), title=f"Largest factored reaction: {case}", **bound)
    steps.bind(R_f=made)
    return made


def _redistributed(
    steps: Steps, model: Model, support: int, row: int, bound: dict[str, Any]
) -> list[str]:
    """Record what redistribution takes off the moments beside a support; give what that changes.

    Moments taken off at the support send less to it, those at the far ends of its spans more:
    the terms of its reaction are statics of the spans beside it (9.2.4).
    """
    terms = []
    for span, near in ends_at(model, support):
        if model.forces.beam.cantilever(span):
            continue
        ends = (("", near), ("-", other(near)))
        taken = [
            f"{sign}{made.symbol}"
            for sign, end in ends
            if (made := _taken_off(steps, model, span, end, row, bound)) is not None
        ]
        if taken:
            bound[f"l_{span}"] = model.lengths[span - 1]
            text = taken[0] if len(taken) == 1 else f"({taken[0]} - {taken[1][1:]})"
            terms.append(f"{text}/l_{span}")
    return terms


def _taken_off(
    steps: Steps, model: Model, span: int, end: End, row: int, bound: dict[str, Any]
) -> Entry | None:
    """Record by how much a case's moment at an end of a span is changed; None if it is not."""
    support, sheet = near_support(span, end), steps.sheet
    if not model.forces.reduced(support, row):
        return None
    entries, factors = sheet.entries_of(ANALYSIS), model.forces.factors_of(row)
    scope = {f"p_{support}": sheet.entry(f"{GIVEN}/p_{support}")}
    terms = []
    for group in groups_of(model):
        name, factor = moment_name(model, group, span, end), _factor(factors, group)
        if factor and name and entries[name].value != 0:
            scope[name] = entries[name]
            terms.append(f"{factor_text(factor)}*{name}")
    if not terms:
        return None
    side = "right" if end == "left" else "left"
    symbol = f"M_q{support}{side[0]}"
    what = f"moment taken off at support {support}, {side} of it"
    sheet.notation = sheet.notation | notation(
        [numbered(symbol, "M", f"q,{support}{side[0]}", what)]
    )
    text = f"{symbol} = p_{support}/100*({' + '.join(terms)})"
    made = sheet.line(
        stated(text, unit="kN.m", clause="9.2.4"),
        title=f"What redistribution takes off the moment at support {support}, {side} of it",
        **named(scope, text),
    )
    bound[symbol] = made
    return made


def _restraint_at(model: Model, support: int) -> dict[str, Any]:
    """Return the assumed moment of restraint of an end support and the span it acts on."""
    span, side = (support, "right") if support == 1 else (support - 1, "left")
    M_f = model.sheet.entry(f"hog-{support}-{side}/M_f")
    return {"M_f": M_f, "l": model.lengths[span - 1]}


def _given_reaction(steps: Steps, R: float, source: str, held: Mapping[str, Any]) -> Entry:
    """Record a reaction that is known as a number, and what a restraint adds; bind it."""
    sheet = steps.sheet
    made = sheet.given("R_fa" if held else "R_f", f"{R / 1000:.12g} kN", source=source)
    if held:
        title = "Largest factored reaction, with the restraint assumed"
        made = sheet.line(stated(f"R_f = R_fa + {_ADDED}"), title=title, R_fa=made, **held)
    steps.bind(R_f=made)
    return made


def _factor(factors: Mapping[tuple[str, int], float], group: Group) -> float:
    spans = [f for (kind, span), f in factors.items() if group.holds(kind, span)]
    return spans[0] if spans else 0.0
