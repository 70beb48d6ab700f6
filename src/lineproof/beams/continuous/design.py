"""The design of a beam in numbers: bars at its sections, bars laid along it, stirrups.

Bars and stirrups rest on each other: a bar is cut where the stirrups let it, and the stirrups count
with the bars that stand. Bars are laid first as if no stirrups helped, then the stirrups are
chosen, then the bars are asked whether they still cover every case with these stirrups.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from typing import Any

from lineproof.beams.bars import BarLayer, BarLayers
from lineproof.beams.continuous import flexure
from lineproof.beams.continuous.anchorage import available, has_hooks, hook_at
from lineproof.beams.continuous.bar_choice import Chosen, TopBars
from lineproof.beams.continuous.detailing import hook_ties, lay_bars
from lineproof.beams.continuous.detailing_data import (
    Basis,
    Designed,
    SectionBars,
    Stirrups,
    Strengths,
)
from lineproof.beams.continuous.detailing_data import TopBars as LaidTop
from lineproof.beams.continuous.detailing_given import read_given_runs, section_bars_of
from lineproof.beams.continuous.flexure import SIDES
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing
from lineproof.beams.continuous.model import Model, outline_of
from lineproof.beams.continuous.shear_stretches import basis_of, span_numbers, stretches_of
from lineproof.beams.continuous.stirrups_choice import Choice, check_stirrups, choose_stirrups
from lineproof.standards.codes import CodePair

HOLDERS = "15M"
"""Size of the two bars that hold the stirrups where no other top bars do (common practice)."""
MOST_ROUNDS = 4
FIRST_SPACING = 300.0


@dataclass(frozen=True, eq=False)
class Design:
    """Everything that is built: bars of the sections, bars along the beam, stirrups."""

    model: Model
    pair: CodePair
    bottom: Mapping[int, Chosen]
    top: Mapping[int, Chosen]
    designed: Designed
    runs: tuple[BarRun, ...]
    stirrups: Choice

    @property
    def outline(self) -> BeamOutline:
        """The concrete of the beam."""
        return self.designed.outline

    @property
    def detailing(self) -> Detailing:
        """Bars and stirrups, the ties around hooks included."""
        ties = hook_ties(self.designed, self.runs)
        return Detailing(self.runs, (*self.stirrups.zones, *ties))


def design_of(model: Model, pair: CodePair) -> Design:
    """Return the design of a beam; raises :class:`UserError` where nothing can do."""
    outline = outline_of(model.sheet, model.inputs)
    basis = _basis(model, outline)
    given = _given_runs(model, basis, pair)
    bottom_given, top_given = _given_sections(model, pair, outline, given)
    bottom = flexure.choose_bottom(model, pair, bottom_given)
    bare = Designed(
        basis, model.forces, SectionBars((), (), HOLDERS), pair, breadths=_breadths(model)
    )
    top = flexure.choose_top(model, pair, top_given, lambda j, size: _anchored(bare, j, size))
    flexure.refuse_unfit(bottom, "bottom_bars")
    flexure.refuse_unfit(top, "top_bars")
    designed = Designed(
        basis, model.forces, _section_bars(model, bottom, top), pair, breadths=_breadths(model)
    )
    return _laid(model, pair, bottom, top, designed, given)


def _laid(
    model: Model,
    pair: CodePair,
    bottom: Mapping[int, Chosen],
    top: Mapping[int, Chosen],
    designed: Designed,
    given: tuple[BarRun, ...] | None,
) -> Design:
    runs = lay_bars(designed) if given is None else given
    for _ in range(MOST_ROUNDS):  # bars and stirrups settle in two rounds as a rule
        choice = _stirrups(model, designed, runs)
        stirrups = _counted(designed, choice)
        designed = replace(
            designed, shear=stretches_of(choice, designed.outline),
            basis=replace(designed.basis, stirrups=stirrups),
        )  # fmt: skip
        if given is not None:
            break
        again = lay_bars(designed)
        if again == runs:
            break
        runs = again
    return Design(model, pair, bottom, top, designed, runs, choice)


def _anchored(bare: Designed, support: int, size: str) -> bool:
    """Tell whether top bars of a size can be hooked into an end support, if they end there."""
    if not bare.exterior(support) or not has_hooks(bare):
        return True
    return hook_at(bare, support, size).l_dh <= available(bare, support)


def _stirrups(model: Model, designed: Designed, runs: Sequence[BarRun]) -> Choice:
    basis, spans = basis_of(model), span_numbers(model, designed, runs)
    if model.inputs.stirrups is None:
        return choose_stirrups(designed.outline, model.forces, basis, spans)
    return check_stirrups(designed.outline, model.forces, basis, spans, model.inputs.stirrups)


def _counted(designed: Designed, choice: Choice) -> Stirrups:
    """Return the stirrups as anchorage counts them: the largest spacing along the beam."""
    spacings = [zone.spacing for zone in choice.zones] or [FIRST_SPACING]
    least = min(check.state.minimum_spacing for check in choice.checks)
    return replace(
        designed.basis.stirrups, spacing=max(spacings), legs=choice.basis.legs,
        minimum=bool(choice.zones) and max(spacings) <= least * (1 + 1e-12),
    )  # fmt: skip


def _basis(model: Model, outline: BeamOutline) -> Basis:
    find, inputs = model.sheet.find, model.inputs
    numbers = {n: find(n).value for n in ("f_c", "f_y", "phi_c", "phi_s", "alpha_1", "a_max")}
    return Basis(
        outline,
        Strengths(**numbers, density=inputs.density),
        Stirrups(inputs.stirrup, inputs.stirrup_legs, FIRST_SPACING),
    )


def _breadths(model: Model) -> dict[int, float]:
    """Return the width of a column across the beam by support, where it is known."""
    return {
        number: min(column.width.value for column in support.columns)
        for number, support in enumerate(model.inputs.supports, start=1)
        if support.columns
    }


def _given_runs(model: Model, basis: Basis, pair: CodePair) -> tuple[BarRun, ...] | None:
    rows: Sequence[Mapping[str, Any]] | None = model.inputs.bar_runs
    return None if rows is None else read_given_runs(rows, basis, pair)


def _given_sections(
    model: Model, pair: CodePair, outline: BeamOutline, runs: tuple[BarRun, ...] | None
) -> tuple[dict[int, BarLayers], dict[int, TopBars]]:
    """Return the bars of the sections that are given, as such or as runs along the beam."""
    if runs is None:
        return flexure.given_bottom(model), flexure.given_top_bars(model, pair)
    found = section_bars_of(runs, outline, HOLDERS)
    sides = SIDES[model.inputs.shape]
    bottom = {span: layers for span, layers in enumerate(found.bottom, start=1) if layers}
    top = {
        support: TopBars(each.web[0], each.overhang // sides if sides else 0, sides)
        for support, each in enumerate(found.top, start=1)
        if each.web
    }
    return bottom, top


def _section_bars(
    model: Model, bottom: Mapping[int, Chosen], top: Mapping[int, Chosen]
) -> SectionBars:
    holders = (BarLayer(2, HOLDERS),)
    bottoms = [layers_of(bottom[k]) if k in bottom else holders for k in range(1, model.spans + 1)]
    tops = [_laid_top(top_of(top[j])) if j in top else LaidTop() for j in range(1, model.spans + 2)]
    return SectionBars(tuple(bottoms), tuple(tops), HOLDERS)


def _laid_top(top: TopBars) -> LaidTop:
    return LaidTop((top.web,), top.sides * top.overhang)


def layers_of(chosen: Chosen) -> BarLayers:
    """Return the layers of bottom bars."""
    if isinstance(chosen.bars, TopBars):
        msg = f"{chosen.section} has no bottom bars"
        raise TypeError(msg)
    return chosen.bars


def top_of(chosen: Chosen) -> TopBars:
    """Return the top bars."""
    if not isinstance(chosen.bars, TopBars):
        msg = f"{chosen.section} has no top bars"
        raise TypeError(msg)
    return chosen.bars
