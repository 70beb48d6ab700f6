"""The stirrups of a beam, chosen or as given, with what governs each and the sections to print."""

from __future__ import annotations

import math
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.layout import BeamOutline, StirrupZone
from lineproof.beams.continuous.shear_check import SpanCheck
from lineproof.beams.continuous.shear_choice import RESERVE, choose_layouts, refuse_open
from lineproof.beams.continuous.shear_numbers import ShearBasis, SpanNumbers, check_basis
from lineproof.beams.continuous.shear_resistance import LEAST_AREA
from lineproof.beams.continuous.shear_sections import ShearSection, sections
from lineproof.beams.continuous.shear_state import SpanState, span_state
from lineproof.beams.continuous.stirrups import GRID, Band, SpanLayout
from lineproof.beams.continuous.stirrups_given import SpanStirrups
from lineproof.errors import FaultList, UserError

_WORDS = {"left": "left end", "middle": "middle", "right": "right end"}


@dataclass(frozen=True, eq=False)
class Choice:
    """Stirrups of a beam: zones along it, one sentence a zone about what governs, the spans.

    ``checks`` hold demand over resistance of every case at every station, one a span.
    """

    basis: ShearBasis
    zones: tuple[StirrupZone, ...]
    reasons: tuple[str, ...]
    checks: tuple[SpanCheck, ...]
    forces: Forces
    chosen: bool

    @cached_property
    def sections(self) -> tuple[tuple[ShearSection, ...], ...]:
        """The sections to be printed, one row a span."""
        return tuple(sections(check, self.forces) for check in self.checks)

    @cached_property
    def worst(self) -> float:
        """The largest demand over resistance of shear, torsion and spacing."""
        return max(float(np.maximum(check.strength, check.spacing).max()) for check in self.checks)

    @property
    def closed(self) -> bool:
        """Whether torsion counts anywhere, so that the stirrups must be closed."""
        return any(bool(check.state.v["counts"].any()) for check in self.checks)


def choose_stirrups(
    outline: BeamOutline,
    forces: Forces,
    basis: ShearBasis,
    spans: Sequence[SpanNumbers],
) -> Choice:
    """Choose the stirrups of a beam; raises :class:`UserError` with every reason why none can do.

    The order is that of :mod:`shear_choice`. Bars that are too weak for the method are no reason:
    more are asked for where they are open (:func:`shear_choice.refuse_strained`), else their
    checks fail.
    """
    states = _states(forces, basis, spans)
    layouts = choose_layouts(states)
    checks: list[SpanCheck] = []
    zones: list[StirrupZone] = []
    reasons: list[str] = []
    for state, layout in zip(states, layouts, strict=True):
        face = outline.faces(state.numbers.span)[0]
        zones += layout.placed(state.numbers.span, face, _one(basis, state.numbers.span))
        reasons += _reasons(state, layout)
        checks.append(SpanCheck(state, layout.bands()))
    return Choice(basis, tuple(zones), tuple(reasons), tuple(checks), forces, chosen=True)


def check_stirrups(
    outline: BeamOutline,
    forces: Forces,
    basis: ShearBasis,
    spans: Sequence[SpanNumbers],
    given: Mapping[int, SpanStirrups],
) -> Choice:
    """Return stirrups as given by span, to be checked; there may be none.

    Raises :class:`UserError` for zones that cannot be built; what does not carry is left to fail
    its check.
    """
    states = _states(forces, basis, spans)
    refuse_open(states)
    _refuse_gaps_with_torsion(states, given)
    checks: list[SpanCheck] = []
    zones: list[StirrupZone] = []
    reasons: list[str] = []
    for state in states:
        span = state.numbers.span
        stirrups = given[span]
        zones += stirrups.placed(outline.faces(span)[0], _one(basis, span))
        check = _finer(state, stirrups.bands, forces)
        checks.append(check)
        reasons += [f"Span {span}, {text}" for text in _standing(check)]
    return Choice(basis, tuple(zones), tuple(reasons), tuple(checks), forces, chosen=False)


def _states(
    forces: Forces, basis: ShearBasis, spans: Sequence[SpanNumbers]
) -> tuple[SpanState, ...]:
    check_basis(basis)
    faults, states = FaultList(), []
    for numbers in spans:
        try:
            states.append(span_state(basis, numbers, forces))
        except UserError as error:
            faults.take(error)
    faults.raise_if_any()
    return tuple(states)


def _one(basis: ShearBasis, span: int) -> StirrupZone:
    return StirrupZone(span, 0.0, 0.0, 1, 0.0, basis.stirrup, basis.legs, basis.closed)


def _finer(state: SpanState, bands: tuple[Band, ...], forces: Forces) -> SpanCheck:
    """Return the check of a span, with the changes of spacing among its stations."""
    start = state.faces[0]
    extra = {start + b.start + side * state.h / 2 for b in bands[1:] for side in (-1, 0, 1)}
    inside = tuple(sorted(x for x in extra if state.faces[0] < x < state.faces[1]))
    if inside:
        state = span_state(state.basis, state.numbers, forces, inside)
    return SpanCheck(state, bands)


def _reasons(state: SpanState, layout: SpanLayout) -> Iterator[str]:
    """Give a sentence for each zone of a span: the spacing and what keeps it from being wider."""
    for name, band in _named(layout):
        text = f"Span {state.numbers.span}, {_WORDS[name]}: {band.spacing:g} mm"
        yield f"{text}; {_governs(state, band)}."


def _named(layout: SpanLayout) -> Iterator[tuple[str, Band]]:
    bands = layout.bands()
    if layout.left:
        yield "left", bands[0]
    yield "middle", bands[1 if layout.left else 0]
    if layout.right:
        yield "right", bands[-1]


def _governs(state: SpanState, band: Band) -> str:
    """Say which rule keeps the spacing of a zone from being 25 mm wider."""
    wider, u = band.spacing + GRID, state.columns - state.faces[0]
    inside = (u >= band.start - 1e-6) & (u <= band.end + 1e-6)
    asked = np.where(inside, state.required * wider / RESERVE, 0.0)
    if asked.max() > 1:
        return _by_strength(state, int(asked.argmax()), wider)
    allowed = np.where(inside, state.allowed.min(axis=0), math.inf)
    least = float(allowed.min())
    if wider > least and least <= state.minimum_spacing:
        return _by_spacing(state, int(allowed.argmin()), least)
    if wider > state.minimum_spacing:
        return f"the minimum stirrups stand at {state.minimum_spacing:.0f} mm (11.2.8.2)"
    return "alike over the beam: a wider spacing would do here"


def _by_spacing(state: SpanState, column: int, least: float) -> str:
    row = int(state.allowed[:, column].argmin())
    v = state.v
    if least < v["s_max"][:, column].min() * (1 - 1e-12):
        return f"the corner bars carry closed stirrups up to {least:.0f} mm apart (11.2.7)"
    if v["counts"][row, column]:
        return f"the largest spacing, halved for torsion, is {least:.0f} mm (11.3.8.3)"
    if v["closer"][row, column]:
        return f"the largest spacing, halved for high shear, is {least:.0f} mm (11.3.8.3)"
    return f"the largest spacing is {least:.0f} mm (11.3.8.1)"


def _by_strength(state: SpanState, column: int, wider: float) -> str:
    row = int(state.v["needed"][:, column].argmax())
    both = state.v["counts"][row, column]
    what = "shear and torsion" if both else "shear"
    x = float(state.v["x"][row, column]) / 1000
    return (
        f"{what} at {x:.2f} m from the left axis would not be carried at {wider:g} mm "
        f"({state.cases[row]})"
    )


def _standing(check: SpanCheck) -> Iterator[str]:
    """Say of each stretch of stirrups as given how much it is used."""
    use = np.maximum(check.strength, check.spacing).max(axis=0)
    bare = ((check.state.v["A_s"] <= LEAST_AREA) & (check.strength > 1)).any(axis=0)
    for number, band in enumerate(check.bands):
        what = "no stirrups" if math.isinf(band.spacing) else f"{band.spacing:g} mm"
        place = f"{band.start / 1000:.2f} to {band.end / 1000:.2f} m"
        own = check.owners == number
        most = float(use[own].max(initial=0.0))
        used = f"used to {100 * most:.0f} % at most" if math.isfinite(most) else "NOT allowed"
        used = "NO resistance where no bars in tension count" if bare[own].any() else used
        yield f"{place}: {what}, as given; {used}."


def _refuse_gaps_with_torsion(
    states: Sequence[SpanState], made: Mapping[int, SpanStirrups]
) -> None:
    faults = FaultList()
    for state in states:
        span, most = state.numbers.span, state.minimum_spacing * (1 + 1e-12)
        if state.v["counts"].any() and any(b.spacing > most for b in made[span].bands):
            faults.add(
                f"stirrups: span {span} has torsion that counts, but part of it has no stirrups or "
                f"fewer than the minimum; write closed stirrups from face to face, at most "
                f"{most:.0f} mm apart"
            )
    faults.raise_if_any()
