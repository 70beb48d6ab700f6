"""The design of a beam in numbers: bars at its sections, bars laid along it, stirrups.

Bars and stirrups rest on each other: a bar is cut where the stirrups let it, and the stirrups count
with the bars that stand. Bars are laid first as if no stirrups helped, then the stirrups are
chosen, then the bars are asked whether they still cover every case with these stirrups.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from functools import cached_property
from itertools import count

from lineproof.beams.bars import BarLayer, BarLayers, TopBars, bars_text
from lineproof.beams.continuous import faces, flexure_choice
from lineproof.beams.continuous.anchored_ends import least_anchored, top_part
from lineproof.beams.continuous.bar_choice import Bars, Chosen
from lineproof.beams.continuous.cutoff import sag_at
from lineproof.beams.continuous.design_torsion import (
    HOLDERS,
    Asked,
    Open,
    more,
    torsion_forces,
)
from lineproof.beams.continuous.detailing import lay_bars
from lineproof.beams.continuous.detailing_data import (
    END_COVER,
    Basis,
    Designed,
    SectionBars,
    ShearStretch,
    Stirrups,
    Strengths,
    SupportTop,
)
from lineproof.beams.continuous.detailing_given import (
    beside_gap,
    bottom_places,
    check_layers,
    section_bars_of,
    tail_cover,
    top_bars_at,
)
from lineproof.beams.continuous.detailing_ties import beside_ties, hook_ties, off_free_ends
from lineproof.beams.continuous.developed import Developed, developed_at
from lineproof.beams.continuous.faces import Face
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing
from lineproof.beams.continuous.model import Model, outline_of
from lineproof.beams.continuous.resistance import Standing, stand
from lineproof.beams.continuous.resistance_cover import Coverage, covered
from lineproof.beams.continuous.shear_choice import refuse_strained
from lineproof.beams.continuous.shear_stretches import (
    basis_of,
    span_numbers,
    stretches_of,
    weaker_of,
)
from lineproof.beams.continuous.skin import SideBars, side_bars, skin_runs, stretch_of
from lineproof.beams.continuous.stirrups_choice import Choice, check_stirrups, choose_stirrups
from lineproof.beams.inputs import OVERHANGS
from lineproof.errors import UserError
from lineproof.standards.codes import CodePair

MOST_ROUNDS = 4
"""Rounds in which bars and stirrups are fitted to each other; two do as a rule."""
MOST_FOR_TORSION = 40
"""Times that bars are made longer or more for torsion."""
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
    raised: tuple[str, ...] = ()
    """Bars that torsion, or shear at a girder, asks for beyond what the moments do, in words."""

    @property
    def outline(self) -> BeamOutline:
        """The concrete of the beam."""
        return self.designed.outline

    @property
    def detailing(self) -> Detailing:
        """Bars and stirrups, skin bars and the ties around hooks included."""
        ties = hook_ties(self.designed, self.runs, self.stirrups.zones)
        return Detailing((*self.runs, *self._skin), (*self.stirrups.zones, *ties))

    @property
    def given(self) -> bool:
        """Whether the bars along the beam are given."""
        return self.model.inputs.bar_runs is not None

    def bottom_bars(self, span: int) -> BarLayers:
        """Return the bottom bars where the moment of a span is largest; () where none stand."""
        return layers_of(self.bottom[span]) if span in self.bottom else ()

    def bottom_beside(self, span: int) -> BarLayers:
        """Return the bottom bars nearest to the largest moment of a span that none cross."""
        return beside_gap(self.runs, self.outline, span, sag_at(self.designed, span))

    def top_bars(self, face: Face) -> TopBars | None:
        """Return the top bars of a face: those of its support, given ones as they stand there."""
        if self.given:
            there = top_bars_at(self.runs, self._place(face), face.name)
            return _as_chosen(there, self.model)
        return top_of(self.top[face.support]) if face.support in self.top else None

    def bottom_counted(self, span: int) -> tuple[Developed, ...]:
        """Return the bottom bars that count where the moment of a span is largest."""
        return developed_at(self.standing, "bottom", sag_at(self.designed, span))

    def top_counted(self, face: Face) -> tuple[Developed, ...]:
        """Return the top bars that count at the face of a support."""
        return developed_at(self.standing, "top", self._place(face))

    @cached_property
    def coverage(self) -> Coverage:
        """How the bars along the beam carry every load case, with the gaps."""
        return covered(self.designed, self.runs)

    @cached_property
    def standing(self) -> tuple[Standing, ...]:
        """The bars along the beam with the lengths over which their stress rises."""
        return stand(self.designed, self.runs)

    def side_bars(self, span: int, near: End | None = None) -> SideBars:
        """Return the bars of the side faces where fewest stand, in a span or near its end."""
        stretch = stretch_of(self.designed, span, near)
        return side_bars(self.designed, self.detailing.bars, span, stretch)

    @cached_property
    def _skin(self) -> tuple[BarRun, ...]:
        """The skin bars that are laid here; those of given bars stand among these."""
        exposure = self.model.inputs.exposure
        return () if self.given else skin_runs(self.designed, exposure)

    def _place(self, face: Face) -> float:
        """Return where a face stands along the beam."""
        return self.outline.faces(face.span)[0 if face.near == "left" else 1]


def design_of(model: Model, pair: CodePair) -> Design:
    """Return the design of a beam; raises :class:`UserError` where nothing can do."""
    outline = outline_of(model.sheet, model.inputs)
    basis = _basis(model, outline)
    given = _given_runs(model, basis)
    sections = _given_sections(model, pair, outline, given)
    asked = Asked()
    made = first = _designed(model, pair, basis, (given, *sections), asked, None)
    for _ in range(MOST_FOR_TORSION):
        further = None
        if given is None:
            free = Open(set(made.bottom) - set(sections[0]), set(made.top) - set(sections[1]))
            standing = stand(made.designed, made.runs)
            further = more(asked, made.stirrups.checks, made.designed, standing, free)
        if further is None:
            if model.inputs.stirrups is None and not model.inputs.bars_given:
                refuse_strained([check.state for check in made.stirrups.checks])
            return replace(made, raised=_raised(first, made))
        asked = further
        made = _designed(model, pair, basis, (given, *sections), asked, made)
    raise UserError(
        "bars: none were found that carry moment, shear and torsion everywhere and are anchored in "
        "the end supports; write a wider or deeper beam, wider end supports, or the bars "
        "themselves as bar_runs"
    )


Given = tuple[tuple[BarRun, ...] | None, dict[int, BarLayers], dict[int, TopBars]]
"""Bars that are given: along the beam, of spans, of supports."""


def _designed(
    model: Model, pair: CodePair, basis: Basis, given: Given, asked: Asked, before: Design | None
) -> Design:
    """Return a design with the bars asked for; the stirrups of the design before are a start."""
    runs, bottom_given, top_given = given
    breadths = _breadths(model)
    none = SectionBars((), (), asked.holders)
    bare = Designed(
        basis, model.forces, none, pair, breadths=breadths,
        end_cover=max(END_COVER, basis.outline.cover),
        restrained=faces.restrained_supports(model),
        tail_cover=tail_cover(basis.outline, runs or ()), as_built=model.inputs.as_built,
        hook_ties=model.inputs.hook_ties,
    )  # fmt: skip
    bottom = flexure_choice.choose_bottom(
        model, pair, bottom_given, asked.bottom,
        lambda k, size: least_anchored(bare, k, size, asked.anchored.get(k, 0.0)),
    )  # fmt: skip
    top = flexure_choice.choose_top(
        model,
        pair,
        top_given,
        lambda j, bars: top_part(bare, j, bars),
        asked.top,
        asked.all_top,
    )
    flexure_choice.refuse_unfit(bottom, "bottom_bars")
    flexure_choice.refuse_unfit(top, "top_bars")
    beside = _beside(bare, bottom, runs, bottom_places(bare.outline, model.forces))
    bars = _section_bars(model, bottom, top, asked.holders, beside)
    designed = replace(bare, bars=bars)
    if before is not None:
        designed = replace(before.designed, bars=bars, torsion={})
    designed, laid, choice = _laid(model, designed, runs)
    zones = beside_ties(designed, laid, off_free_ends(designed, choice.zones))
    choice = replace(choice, zones=zones)
    return Design(model, pair, bottom, top, designed, laid, choice)


def _laid(
    model: Model, designed: Designed, given: tuple[BarRun, ...] | None
) -> tuple[Designed, tuple[BarRun, ...], Choice]:
    """Return bars along the beam and stirrups that rest on each other.

    Both are worked out in turn until neither changes. After some rounds the stirrups are counted as
    the widest met, and bars are laid for the least resistance to shear met at each place, which
    ends their change; after some more the bars stay as they are.
    """
    runs = lay_bars(designed) if given is None else given
    least: tuple[ShearStretch, ...] = ()
    for number in count():
        choice = _stirrups(model, designed, runs)
        stirrups = _counted(designed, choice)
        shear = stretches_of(choice, designed.outline)
        if number >= MOST_ROUNDS:
            stirrups = _worse(stirrups, designed.basis.stirrups)
        least = weaker_of(least, shear) if number > MOST_ROUNDS else shear
        settled = replace(
            designed, shear=shear, basis=replace(designed.basis, stirrups=stirrups),
            torsion=torsion_forces(choice.checks, designed.bars, stand(designed, runs)),
        )  # fmt: skip
        again = runs
        if given is None and number < 2 * MOST_ROUNDS:
            again = lay_bars(replace(settled, shear=least))
        if again == runs and stirrups == designed.basis.stirrups:
            return settled, runs, choice
        designed, runs = settled, again
    raise AssertionError  # the count does not end


def _worse(first: Stirrups, second: Stirrups) -> Stirrups:
    """Return stirrups that count no more than either of two."""
    return replace(
        first,
        spacing=max(first.spacing, second.spacing),
        minimum=first.minimum and second.minimum,
    )


def _raised(first: Design, made: Design) -> tuple[str, ...]:
    """Say which bars torsion or shear asks for beyond what the moments do."""
    told = [
        f"{where}: {_text(now.bars)}, by the moments alone {_text(was.bars)}"
        for before, after in ((first.bottom, made.bottom), (first.top, made.top))
        for (where, was), now in zip(
            ((chosen.section, chosen) for chosen in before.values()), after.values(), strict=True
        )
        if was.bars != now.bars
    ]
    holders = made.designed.bars.holders
    if holders != first.designed.bars.holders:
        told.append(f"bars that hold the stirrups: 2-{holders}, without torsion 2-{HOLDERS}")
    return tuple(told)


def _text(bars: Bars) -> str:
    return str(bars) if isinstance(bars, TopBars) else bars_text(bars)


def _stirrups(model: Model, designed: Designed, runs: Sequence[BarRun]) -> Choice:
    basis, spans = basis_of(model), span_numbers(model, designed, runs)
    if model.inputs.stirrups is None:
        return choose_stirrups(designed.outline, model.forces, basis, spans)
    return check_stirrups(designed.outline, model.forces, basis, spans, model.inputs.stirrups)


def _counted(designed: Designed, choice: Choice) -> Stirrups:
    """Return the stirrups as anchorage counts them: the largest spacing along the beam.

    It is infinite where some stretch has none.
    """
    spacings = [band.spacing for check in choice.checks for band in check.bands]
    spacing = max([*spacings, *(zone.spacing for zone in choice.zones)])
    least = min(check.state.minimum_spacing for check in choice.checks)
    return replace(
        designed.basis.stirrups, spacing=spacing, legs=choice.basis.legs,
        minimum=spacing <= least * (1 + 1e-12),
    )  # fmt: skip


def _basis(model: Model, outline: BeamOutline) -> Basis:
    find, inputs = model.sheet.find, model.inputs
    numbers = {n: find(n).value for n in ("f_c", "f_y", "phi_c", "phi_s", "alpha_1", "a_max")}
    return Basis(
        outline,
        Strengths(**numbers, density=inputs.density, coating=inputs.coating),
        Stirrups(inputs.stirrup, inputs.stirrup_legs, FIRST_SPACING),
    )


def _breadths(model: Model) -> dict[int, float]:
    """Return the width of a column across the beam by support, where it is known."""
    return {
        number: min(column.width.value for column in support.columns)
        for number, support in enumerate(model.inputs.supports, start=1)
        if support.columns
    }


def _given_runs(model: Model, basis: Basis) -> tuple[BarRun, ...] | None:
    runs = model.inputs.bar_runs
    if runs is not None:
        check_layers(runs, basis)
    return runs


def _given_sections(
    model: Model, pair: CodePair, outline: BeamOutline, runs: tuple[BarRun, ...] | None
) -> tuple[dict[int, BarLayers], dict[int, TopBars]]:
    """Return the bars of the sections that are given, as such or as runs along the beam."""
    if runs is None:
        return flexure_choice.given_bottom(model), flexure_choice.given_top_bars(model, pair)
    found = section_bars_of(runs, outline, HOLDERS, bottom_places(outline, model.forces))
    bottom = {span: layers for span, layers in enumerate(found.bottom, start=1) if layers}
    top = {support: _as_chosen(each, model) for support, each in enumerate(found.top, start=1)}
    return bottom, {support: each for support, each in top.items() if each is not None}


def _as_chosen(top: SupportTop, model: Model) -> TopBars | None:
    """Return top bars that stand at a place as those of a section; None without any in the web."""
    sides = OVERHANGS[model.inputs.shape]
    if not top.web:
        return None
    beside = top.overhang // sides if sides else 0
    upper = top.web[1] if len(top.web) > 1 else None
    return TopBars(top.web[0], beside, sides, top.overhang_size, upper)


def _beside(
    bare: Designed,
    bottom: Mapping[int, Chosen],
    runs: tuple[BarRun, ...] | None,
    places: Sequence[float],
) -> dict[int, BarLayers]:
    """Return the nearest bottom bars of the spans whose largest moment no given bars cross."""
    spans = range(1, len(bare.outline.lengths) + 1) if runs is not None else ()
    empty = [k for k in spans if k not in bottom and not bare.cantilever(k)]
    return {k: beside_gap(runs or (), bare.outline, k, places[k - 1]) for k in empty}


def _section_bars(
    model: Model,
    bottom: Mapping[int, Chosen],
    top: Mapping[int, Chosen],
    size: str,
    beside: Mapping[int, BarLayers],
) -> SectionBars:
    holders = (BarLayer(2, size),)
    bottoms = [
        layers_of(bottom[k]) if k in bottom else beside.get(k) or holders
        for k in range(1, model.spans + 1)
    ]
    tops = [
        _laid_top(top_of(top[j])) if j in top else SupportTop() for j in range(1, model.spans + 2)
    ]
    return SectionBars(tuple(bottoms), tuple(tops), size)


def _laid_top(top: TopBars) -> SupportTop:
    return SupportTop(top.layers, top.sides * top.overhang, top.overhang_size)


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
