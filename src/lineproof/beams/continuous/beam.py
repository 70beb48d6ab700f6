"""A beam of any number of spans: each call records one chapter of the calculation."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import replace
from typing import Any

from lineproof.beams import basics
from lineproof.beams.continuous import faces, flexure
from lineproof.beams.continuous import loads as load_take_down
from lineproof.beams.continuous.anchorage_chapter import record_anchorage, record_ends
from lineproof.beams.continuous.coefficients import record_coefficients
from lineproof.beams.continuous.cover import record_cover
from lineproof.beams.continuous.cures_flow import Found, record_cures
from lineproof.beams.continuous.cures_tried import (
    Calculated,
    Failing,
    Runs,
    Tried,
    failing,
    failing_of,
)
from lineproof.beams.continuous.deflections import (
    SERVICE,
    record_deflections,
    record_not_covered,
)
from lineproof.beams.continuous.deliverables import SCHEDULE, record_schedule
from lineproof.beams.continuous.design import Design, design_of, layers_of, top_of
from lineproof.beams.continuous.geometry import record_spans
from lineproof.beams.continuous.imported_record import not_covered, record_imported_analysis
from lineproof.beams.continuous.inputs import ContinuousInputs, read_inputs
from lineproof.beams.continuous.model import (
    ANALYSIS,
    GIVEN,
    LOADS,
    Model,
    model_of,
    span_key,
)
from lineproof.beams.continuous.not_here import not_here
from lineproof.beams.continuous.reactions import ties_not_covered
from lineproof.beams.continuous.resistance_cover import COVERAGE, Gap, covered
from lineproof.beams.continuous.shear_chapter import STIRRUPS, record_shear
from lineproof.beams.continuous.statics import record_analysis
from lineproof.beams.continuous.summary_chapter import SUMMARY, record_summary
from lineproof.beams.floor_beam import keep_typed, prepare
from lineproof.errors import inputs_named
from lineproof.quantity import QuantityInput
from lineproof.record import Part
from lineproof.sheet import Sheet, Trial
from lineproof.standards.codes import CodePair

LOADS_CALL, SPANS_CALL, ANALYSIS_CALL = "beam.loads()", "beam.spans()", "beam.analysis()"
FLEXURE_CALL, SHEAR_CALL = "beam.flexure()", "beam.shear()"
DEFLECTIONS_CALL, ANCHORAGE_CALL = "beam.deflections()", "beam.anchorage()"
SCHEDULE_CALL, SUMMARY_CALL = "beam.schedule()", "beam.summary()"
_BEFORE_DESIGN = ("continuous_beam(...)", LOADS_CALL, SPANS_CALL, ANALYSIS_CALL)
"""Calls whose parts the design rests on."""
QuantityOrList = QuantityInput | Sequence[QuantityInput]


class ContinuousBeam:
    """A beam on a sheet.

    Every number stands on the sheet, so that cells may be run again in any order. The beam itself
    keeps the sheet, the checked inputs and the code pair, and the design it made last with the
    cures found for it, for as long as what that rests on is the same. Without ``cures`` none are
    sought.
    """

    def __init__(
        self, sheet: Sheet, inputs: ContinuousInputs, pair: CodePair, *, cures: bool = True
    ) -> None:
        self.sheet, self.inputs, self.pair, self._cures = sheet, inputs, pair, cures
        self._last: tuple[tuple[str, ...], Design, Found] | None = None

    @property
    def model(self) -> Model:
        """The beam as analysed, from what stands on the sheet."""
        return model_of(self.sheet, self.inputs)

    @property
    def design(self) -> Design:
        """Bars and stirrups, given or chosen, from what stands on the sheet."""
        return self._designed()[0]

    def _designed(self) -> tuple[Design, Found]:
        """Return the design and the cures found for it so far."""
        key = tuple(
            entry.digest
            for part in self.sheet.parts
            if self.sheet.expected.get(part.key) in _BEFORE_DESIGN
            for entry in part.entries.values()
        )
        if self._last is None or self._last[0] != key:
            tried = Tried(self._with_bars) if self._cures else None
            self._last = key, design_of(self.model, self.pair), Found(tried)
        _, design, cures = self._last
        return replace(design, model=self.model), cures

    def _with_bars(self, runs: Runs) -> Calculated:
        """Return the beam calculated with other bars along it; the sheet stays as it is."""
        inputs = replace(self.inputs, bar_runs=tuple(replace(run, mark="") for run in runs))
        beam = ContinuousBeam(Trial(self.sheet), inputs, self.pair, cures=False)
        return Calculated(beam._chapters(), beam._gaps)

    def _gaps(self) -> tuple[Gap, ...]:
        """Return the gaps in the bars along the beam."""
        design = self.design
        return covered(design.designed, design.runs).gaps

    def _chapters(self) -> Iterator[Failing]:
        """Give the checks that fail after every chapter; the cover by bars is not recorded."""
        for call in (self.flexure, self.shear, self.deflections, self._ends):
            call()
            yield failing_of(self.sheet.parts)

    def _cure(self, part: Part) -> None:
        """Record in a part that is about to close what would cure the checks that fail in it."""
        if self._cures and failing(part):
            design, cures = self._designed()
            record_cures(design, part, cures)

    def loads(self) -> None:
        """Record the columns that hold the beam and the load take-down."""
        with self.sheet.chapter(LOADS_CALL):
            load_take_down.record_columns(self.sheet, self.inputs)
            load_take_down.record_loads(self.sheet, self.inputs, self.pair)

    def spans(self) -> None:
        """Record clear length, effective flange and gross section of every span."""
        with self.sheet.chapter(SPANS_CALL):
            record_spans(self.sheet, self.inputs)

    def analysis(self) -> None:
        """Record support moments and reactions by load type, and the coefficients beside.

        With ``forces_csv``, what was brought in and checked instead.
        """
        self.sheet.need(LOADS_CALL, SPANS_CALL)
        with self.sheet.chapter(ANALYSIS_CALL):
            if self.inputs.forces_file is not None:
                record_imported_analysis(self.model)
            else:
                record_analysis(self.model)
                if self.model.spans > 1:
                    record_coefficients(self.model)
        _tell_not_covered(self.sheet, self.inputs)

    def flexure(self) -> None:
        """Record bars and resistance at every span and both faces of every support."""
        self.sheet.need(*_BEFORE_DESIGN)
        design = self.design
        if design.given:
            sizes = [run.size for run in design.runs]
        else:
            sizes = [layer.size for made in design.bottom.values() for layer in layers_of(made)]
            sizes += [top_of(made).web.size for made in design.top.values()]
        with self.sheet.chapter(FLEXURE_CALL, closing=self._cure):
            sizes = sizes or [run.size for run in design.runs]
            record_cover(self.sheet, self.inputs, sizes, design.outline)
            for span in faces.sagging_spans(design.model):
                flexure.record_sag(design, span)
            for support in self.inputs.held:
                flexure.record_hog(design, support)

    def shear(self) -> None:
        """Record stirrups, shear and torsion, supports, and the plane of flange and web."""
        self.sheet.need(*_BEFORE_DESIGN, FLEXURE_CALL)
        with self.sheet.chapter(SHEAR_CALL, closing=self._cure):
            record_shear(self.design)

    def deflections(self) -> None:
        """Record the deflections of every span; with ``forces_csv`` that they are not covered."""
        self.sheet.need(*_BEFORE_DESIGN, FLEXURE_CALL)
        with self.sheet.chapter(DEFLECTIONS_CALL, closing=self._cure):
            if self.inputs.forces_file is not None:
                record_not_covered(self.sheet)
                return
            record_deflections(self.design)

    def anchorage(self) -> None:
        """Record development, hooks, cut-off points, laps, and the cover of all moments by bars."""
        self.sheet.need(*_BEFORE_DESIGN, FLEXURE_CALL)
        with self.sheet.chapter(ANCHORAGE_CALL, closing=self._cure):
            record_anchorage(self.design)

    def _ends(self) -> None:
        """Record the chapter of the anchorage without the cover of all moments by bars."""
        with self.sheet.chapter(ANCHORAGE_CALL):
            record_ends(self.design)

    def schedule(self) -> None:
        """Record bar schedule, bends, stirrup schedule and quantities."""
        self.sheet.need(*_BEFORE_DESIGN, FLEXURE_CALL, SHEAR_CALL, ANCHORAGE_CALL)
        with self.sheet.chapter(SCHEDULE_CALL):
            record_schedule(self.design)

    def summary(self) -> None:
        """Record the summary pages: drawings, governing tables, reactions, envelopes."""
        self.sheet.need(
            *_BEFORE_DESIGN, FLEXURE_CALL, SHEAR_CALL, DEFLECTIONS_CALL, ANCHORAGE_CALL,
            SCHEDULE_CALL,
        )  # fmt: skip
        with self.sheet.chapter(SUMMARY_CALL):
            record_summary(*self._designed())


@inputs_named
def continuous_beam(
    sheet: Sheet,
    *,
    spans: Sequence[QuantityInput],
    supports: Sequence[str],
    h: QuantityOrList,
    b_w: QuantityInput,
    h_f: QuantityInput | None,
    spacing: QuantityInput,
    f_c: QuantityInput,
    grade: str,
    superimposed: QuantityInput,
    use: str,
    exposure: str,
    fire_rating: QuantityInput,
    cover: QuantityInput,
    columns: Mapping[int, Sequence[str] | str] | None = None,
    shape: str = "T",
    tributary_width: QuantityInput | None = None,
    partitions: QuantityInput | None = None,
    live_load: QuantityInput | None = None,
    snow: QuantityInput | None = None,
    floor_weight: QuantityInput | None = None,
    reduce_live_load: bool = False,
    loads: Sequence[Mapping[str, Any]] = (),
    construction_load: QuantityInput | None = None,
    density: str = "normal",
    gamma_c: QuantityInput = "2400 kg/m3",
    gamma_w: QuantityInput | None = None,
    coating: str = "none",
    aggregate: QuantityInput = "20 mm",
    fire_aggregate: str = "S",
    stirrup: str = "10M",
    shear_method: str = "general",
    bottom_bars: Sequence[str | None] | str | None = None,
    top_bars: Sequence[str | None] | str | None = None,
    minimum_rule: str = "10.5.1.2",
    carries: str = "roof or floor with parts attached that deflection damages",
    attached_after: str = "3 months",
    sustained: QuantityInput | None = None,
    redistribution: Mapping[int, float] | None = None,
    stirrup_legs: int = 2,
    closed_stirrups: bool = False,
    stirrups: Sequence[Mapping[str, Any]] | None = None,
    bar_runs: Sequence[Mapping[str, Any]] | None = None,
    hook_ties: Mapping[int, QuantityInput] | None = None,
    torques: Mapping[str, QuantityInput] | None = None,
    torsion: str = "compatibility",
    slab_bars: str | None = None,
    forces_csv: str | None = None,
    reactions_csv: str | None = None,
    web_openings: str = "none",
) -> ContinuousBeam:
    """Start a beam of one or more spans: check all inputs, record them and the materials.

    ``spans`` and ``supports`` go from left to right; a support is typed ``'column 450 mm'``,
    ``'girder 400 mm'``, ``'wall 300 mm'`` (``, fixed`` where it holds the beam against turning) or
    ``'free'`` at the end of a cantilever. ``columns`` holds, by number of the support, the columns
    below and above that hold the beam elastically. ``loads`` are those beside the floor:
    ``{'type': 'L', 'span': 2, 'point': '40 kN', 'at': '3.1 m', 'what': 'beam B12'}``. Bars left
    out are chosen. ``hook_ties`` gives the spacing of the ties around hooks of a beam as built, by
    the number of its end supports. ``forces_csv`` names a file of an office's frame analysis whose
    moments, shears and torsions stand in the place of our own, ``reactions_csv`` its reactions.

    Raises :class:`UserError` with every fault at once, before anything is recorded.
    """
    given: dict[str, Any] = dict(locals())
    inputs, pair = read_inputs(given, sheet.project)
    keep_typed(sheet, given)
    _begin(sheet, f"{inputs!r} {pair!r}", anew=inputs.forces_file is not None)
    prepare(sheet, pair)
    sheet.member = member_of(inputs)
    beam = ContinuousBeam(sheet, inputs, pair)
    if not sheet.expected:
        sheet.expect(calls_of(inputs))
    _tell_not_covered(sheet, inputs)
    load_take_down.record_given(sheet, inputs)
    basics.record_materials(sheet, inputs.density, inputs.grade, pair, whole_beam=True)
    return beam


def _tell_not_covered(sheet: Sheet, inputs: ContinuousInputs) -> None:
    """Say what is not covered: by the inputs, and by the analysis if it has been made."""
    rows = [*not_covered(inputs), *not_here(inputs), *ties_not_covered(sheet)]
    sheet.not_covered = rows


def _begin(sheet: Sheet, basis: str, *, anew: bool) -> None:
    """Keep the chapters of a sheet that was started with the same inputs; else begin anew.

    Which parts a chapter makes depends on all inputs: with others, what was made is not to be
    taken for what they would make. A file of forces may have changed behind its name.
    """
    if anew or sheet.started_with != basis:
        sheet.begin_anew()
    sheet.started_with = basis


def member_of(inputs: ContinuousInputs) -> str:
    """Say what kind of beam it is."""
    count = len(inputs.spans)
    spans = "one span" if count == 1 else f"{count} spans"
    return f"beam of {spans}, {inputs.shape} section"


def calls_of(inputs: ContinuousInputs) -> dict[str, str]:
    """Return a part of every chapter with the call that makes it, in the order of the calculation.

    Which other parts a call makes shows when it is run.
    """
    start = "continuous_beam(...)"
    calls = {
        GIVEN: start, basics.MATERIALS: start, LOADS: LOADS_CALL, span_key(1): SPANS_CALL,
        ANALYSIS: ANALYSIS_CALL, basics.COVER: FLEXURE_CALL, STIRRUPS: SHEAR_CALL,
        SERVICE: DEFLECTIONS_CALL, COVERAGE: ANCHORAGE_CALL,
        SCHEDULE: SCHEDULE_CALL, SUMMARY: SUMMARY_CALL,
    }  # fmt: skip
    if inputs.forces_file is not None:
        del calls[SERVICE]
    return calls
