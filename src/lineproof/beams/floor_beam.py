"""One simply supported floor beam, from its loads to its bars: each call records parts."""

from __future__ import annotations

from collections.abc import Mapping
from copy import deepcopy
from typing import Any

from lineproof.beams import basics, choice, loading
from lineproof.beams.bars import BarLayer, BarLayers, bars_text
from lineproof.beams.bottom_bars import BARS, COMPRESSION_BARS, record_bars, refuse_unfit
from lineproof.beams.capacity import record_capacity
from lineproof.beams.cracks import CRACKS, record_cracks
from lineproof.beams.flexure import (
    BALANCED,
    FLEXURE,
    REQUIRED,
    midspan,
    record_balanced,
    record_doubly,
    record_flexure,
    record_required,
)
from lineproof.beams.inputs import FloorBeamInputs, read_floor_beam
from lineproof.beams.minimum_steel import MINIMUM, record_minimum
from lineproof.beams.record_figures import moment_level, record_section_figure, record_strain_figure
from lineproof.beams.second_path import SECOND_PATH, record_second_path
from lineproof.beams.section import SECTION, record_section
from lineproof.beams.steps import Steps
from lineproof.beams.top_steel import TOP_STEEL, record_free_ends, record_top_steel
from lineproof.errors import inputs_named
from lineproof.quantity import QuantityInput
from lineproof.sheet import Sheet, Trial
from lineproof.standards.a23_3 import bars as bar_clause
from lineproof.standards.a23_3 import minimum
from lineproof.standards.catalogue import NOTATION
from lineproof.standards.codes import CodePair

SCOPE = "preliminary: flexure only"
NOT_COVERED = (
    {"check": "Concentrated live loads", "clause": "NBC 4.1.5.9"},
    {"check": "Shear and stirrups", "clause": "11.3"},
    {"check": "Torsion", "clause": "11.3.10"},
    {"check": "Deflection", "clause": "9.8"},
    {"check": "Development, cut-off and laps of bars", "clause": "12"},
    {"check": "Bearing at the supports", "clause": "10.8"},
    {"check": "Hanger stirrups where a girder carries the beam", "clause": "11.2.12"},
    {"check": "Structural integrity", "clause": "NBC 4.1.1.3"},
    {"check": "Vibration of the floor", "clause": "NBC 4.1.3.6"},
)
_CALLS = {
    basics.GIVEN: "floor_beam(...)",
    basics.MATERIALS: "floor_beam(...)",
    loading.LOADS: "beam.loads()",
    SECTION: "beam.section()",
    BARS: "beam.bars()",
    basics.COVER: "beam.bars()",
    COMPRESSION_BARS: "beam.bars()",
    BALANCED: "beam.balanced()",
    REQUIRED: "beam.flexure()",
    FLEXURE: "beam.flexure()",
    SECOND_PATH: "beam.second_path()",
    f"{SECOND_PATH}-balanced": "beam.second_path()",
    MINIMUM: "beam.minimum_steel()",
    TOP_STEEL: "beam.top_steel()",
    CRACKS: "beam.crack_control()",
    "summary": "beam.summary()",
    "capacity": "beam.summary()",
}
"""The call that makes each part, in the order of the calculation."""
_WITHOUT_COMPRESSION_BARS = (REQUIRED, "capacity")
"""Parts of a beam without compression bars only."""


class FloorBeam:
    """One simply supported floor beam on a sheet.

    It keeps nothing but the sheet, the checked inputs and the code pair: every number stands on
    the sheet, so that cells may be run again in any order.
    """

    def __init__(self, sheet: Sheet, inputs: FloorBeamInputs, pair: CodePair) -> None:
        self.sheet, self.inputs, self.pair = sheet, inputs, pair

    def loads(self) -> None:
        """Record the load take-down, the factored load and the moment."""
        loading.record_loads(self.sheet, self.inputs)

    def section(self) -> None:
        """Record the effective flange, the gross section and the cracking moments."""
        record_section(self.sheet, self.inputs.shape)

    def bars(self) -> None:
        """Record bottom bars, as given or chosen, the effective depth and the cover."""
        self._need("loads/M_f", "section/I_g")
        self._refuse_unfit_compression_bars()
        layers = self.inputs.bottom_bars
        if layers is None:
            layers = choice.first_that_holds(
                self.sheet, self._plausible(), self._try_bottom, "bottom_bars"
            )
        self._record_bars(self.sheet, layers)
        if self.inputs.bottom_bars is not None:
            refuse_unfit(self.sheet, layers, "bottom_bars")

    def _need(self, *entry_ids: str) -> None:
        """Refuse, naming the call to run first, before bars are tried on what is missing."""
        for entry_id in entry_ids:
            self.sheet.entry(entry_id)

    def _refuse_unfit_compression_bars(self) -> None:
        """Refuse them before any bottom bars are chosen: no choice could make them fit."""
        given = self.inputs.compression_bars
        if given is not None:
            trial = Trial(self.sheet)
            self._record_bars(trial, (BarLayer(2, "15M"),))
            refuse_unfit(trial, given, "compression_bars", COMPRESSION_BARS)

    def _record_bars(self, sheet: Sheet, layers: BarLayers) -> None:
        record_bars(
            sheet, layers, stirrup=self.inputs.stirrup, chosen=self.inputs.bottom_bars is None
        )
        basics.record_cover(sheet, self.inputs)
        if self.inputs.compression_bars is not None:
            self._record_compression_bars(sheet, self.inputs.compression_bars[0])

    def _record_compression_bars(self, sheet: Sheet, layer: BarLayer) -> None:
        with sheet.part(COMPRESSION_BARS, "Compression bars, counted at midspan"):
            sheet.note("bars-text", f"Compression bars at midspan: {layer}.", title="Bars")
            steps = Steps(sheet, {n: sheet.entry(f"{BARS}/{n}") for n in ("d_bs", "r_s")})
            n_c = sheet.given("n_c", str(layer.number), source="given")
            steps.bind(
                d_b=sheet.lookup("d_b", bar_clause.BARS, layer.size),
                A_b=sheet.lookup("A_b", bar_clause.BARS, layer.size),
                n_c=n_c,
                n_b=n_c,
            )
            steps.lines(bar_clause.LEAST_CLEAR, bar_clause.CLEAR)
            steps.check(bar_clause.FITS)
            basics.record_bar_cover(steps)
            steps.lines(bar_clause.COMPRESSION_AREA, bar_clause.COMPRESSION_DEPTH)

    def _plausible(self) -> list[BarLayers]:
        """Leave out layouts that cannot carry the moment even with the whole depth as lever arm."""
        find = self.sheet.find
        least = self.sheet.entry("loads/M_f").value / (
            find("phi_s").value * find("f_y").value * find("h").value
        )
        return [
            layers
            for layers in choice.bottom_candidates()
            if sum(layer.area for layer in layers) >= least
        ]

    def _try_bottom(self, trial: Sheet, layers: BarLayers) -> None:
        self._record_bars(trial, layers)
        # By key, not by place: a part of an earlier run may stand behind them.
        laid = [p for p in trial.parts if p.key in (BARS, basics.COVER, COMPRESSION_BARS)]
        if choice.failed_check(laid) is not None:
            return
        self._record_flexure(trial)
        record_minimum(trial, self.inputs.shape, self.inputs.minimum_rule)
        record_cracks(trial, self.inputs, layers)

    def _record_flexure(self, sheet: Sheet) -> None:
        if self.inputs.compression_bars is not None:
            record_doubly(sheet, self.inputs.shape, self.pair)
        else:
            record_required(sheet, self.inputs.shape)
            record_flexure(sheet, self.inputs.shape, self.pair)

    def balanced(self) -> None:
        """Record the balanced condition: neutral axis, steel and moment."""
        record_balanced(self.sheet, self.inputs.shape)

    def flexure(self) -> None:
        """Record the steel required, the resistance at midspan and its checks."""
        self._record_flexure(self.sheet)

    def second_path(self) -> None:
        """Record the proofs of the resistances by layers and strains."""
        record_second_path(self.sheet, self.inputs.shape)

    def minimum_steel(self) -> None:
        """Record the minimum reinforcement at midspan."""
        record_minimum(self.sheet, self.inputs.shape, self.inputs.minimum_rule)

    def top_steel(self) -> None:
        """Record the top bars at the ends for the restraint that exists."""
        if self.inputs.ends == "free":
            record_free_ends(self.sheet)
            return
        self._need("loads/w_f", "section/I_g")
        given = self.inputs.top_bars
        area, sides = self._spread_area(), 2 if self.inputs.shape == "T" else 1
        if given is not None:
            web, overhang = given[0], choice.bars_for(area, given[0].size)
        else:
            web, overhang = choice.first_that_holds(
                self.sheet, choice.top_candidates(area, sides), self._try_top, "top_bars"
            )
        record_top_steel(self.sheet, self.inputs, self.pair, web, overhang)
        if given is not None:
            refuse_unfit(self.sheet, given, "top_bars", TOP_STEEL)

    def _spread_area(self) -> float:
        """Return the area of top bars that an overhang needs [mm2], from the clause itself."""
        if not self.inputs.slab:
            return 0.0
        trial = Trial(self.sheet)
        # In the part of the top bars themselves: one of an earlier run makes way.
        with trial.part(TOP_STEEL, "Top bars in the overhang"):
            trial.line(minimum.SPREAD_WIDTH)
            return float(trial.line(minimum.SPREAD_AREA).value)

    def _try_top(self, trial: Sheet, candidate: tuple[BarLayer, int]) -> None:
        web, overhang = candidate
        record_top_steel(trial, self.inputs, self.pair, web, overhang, proof=False)

    def crack_control(self) -> None:
        """Record crack control at midspan and the skin reinforcement."""
        record_cracks(self.sheet, self.inputs, layers_on(self.sheet))

    def summary(self) -> None:
        """Record the section with its bars, strains at the resistance and the capacity curve."""
        sheet, shape = self.sheet, self.inputs.shape
        layers = layers_on(sheet)
        M_r = sheet.entry(f"{FLEXURE}/M_r")
        with sheet.part("summary", "Section and state at the resistance"):
            record_section_figure(
                sheet, shape, layers, self.inputs.stirrup, sheet.entries_of(TOP_STEEL)
            )
            record_strain_figure(sheet, shape, layers)
        if self.inputs.compression_bars is None:
            A_s = midspan(sheet, shape).place["A_s"]
            levels = [
                moment_level(sheet.entry("loads/M_f"), "f", "factored moment", "long"),
                moment_level(sheet.entry("section/M_cr"), "cr", "cracking moment", "dotted"),
            ]
            record_capacity(sheet, shape, (A_s, M_r), bars_text(layers), levels, tabulate=False)


def layers_on(sheet: Sheet) -> BarLayers:
    """Return the bottom bars as they stand on the sheet."""
    entries = sheet.entries_of(BARS)
    rows = [(n, d) for n, d in (("n_1", "d_b"), ("n_2", "d_b2")) if n in entries]
    return tuple(BarLayer(round(entries[n].value), entries[d].source.row) for n, d in rows)


@inputs_named
def floor_beam(
    sheet: Sheet,
    *,
    span: QuantityInput,
    spacing: QuantityInput,
    b_w: QuantityInput,
    h: QuantityInput,
    h_f: QuantityInput | None,
    f_c: QuantityInput,
    grade: str,
    superimposed: QuantityInput,
    use: str,
    exposure: str,
    fire_rating: QuantityInput,
    cover: QuantityInput,
    shape: str = "T",
    tributary_width: QuantityInput | None = None,
    live_load: QuantityInput | None = None,
    floor_weight: QuantityInput | None = None,
    density: str = "normal",
    gamma_c: QuantityInput = "2400 kg/m3",
    aggregate: QuantityInput = "20 mm",
    fire_aggregate: str = "S",
    stirrup: str = "10M",
    ends: str = "cast with a girder",
    bottom_bars: str | None = None,
    compression_bars: str | None = None,
    top_bars: str | None = None,
    minimum_rule: str = "10.5.1.2",
    waive_minimum_at_ends: bool = False,
    web_openings: str = "none",
) -> FloorBeam:
    """Start a simply supported floor beam: check all inputs, record them and the materials.

    Quantities are typed with their unit. ``bottom_bars`` and ``top_bars`` left out are chosen.
    ``shape`` is T, L or rectangular; ``ends`` free, cast with a girder, or cast with a column.
    Raises :class:`UserError` with every fault at once, before anything is recorded.
    """
    given: dict[str, Any] = dict(locals())
    inputs, pair = read_floor_beam(given, sheet.project)
    keep_typed(sheet, given)
    return _start(sheet, inputs, pair)


def _start(sheet: Sheet, inputs: FloorBeamInputs, pair: CodePair) -> FloorBeam:
    prepare(sheet, pair)
    sheet.member = f"floor beam, one simple span, {inputs.shape} section"
    sheet.scope = SCOPE
    sheet.not_covered = not_covered(inputs)
    doubly = inputs.compression_bars is not None
    left_out = _WITHOUT_COMPRESSION_BARS if doubly else (COMPRESSION_BARS,)
    sheet.expect({key: call for key, call in _CALLS.items() if key not in left_out})
    basics.record_given(sheet, inputs)
    basics.record_materials(sheet, inputs.density, inputs.grade, pair)
    return FloorBeam(sheet, inputs, pair)


def not_covered(inputs: FloorBeamInputs) -> list[Mapping[str, str]]:
    """Return the checks of a complete calc that this one does not hold."""
    rows: list[Mapping[str, str]] = [dict(row) for row in NOT_COVERED]
    if inputs.slab:
        rows.append({"check": "Shear between flange and web", "clause": "11.5"})
    else:
        rows.append({"check": "Fire resistance of the floor carried", "clause": "NBC D-2.2"})
    if inputs.ends != "free":
        rows.append({"check": "Crack control of the top bars at the ends", "clause": "10.6.1"})
    if inputs.compression_bars is not None:
        rows.append({"check": "Ties of the compression bars", "clause": "7.6.5"})
    return rows


def keep_typed(sheet: Sheet, given: Mapping[str, Any]) -> None:
    """Keep the inputs of a start call as typed, by name; lists may be changed in place later."""
    sheet.typed = deepcopy({name: value for name, value in given.items() if name != "sheet"})


def prepare(sheet: Sheet, pair: CodePair) -> None:
    """Give the sheet the catalogue's notation and the names of the codes."""
    sheet.notation = NOTATION | sheet.notation
    sheet.codes = {"pair": pair.name, "building": pair.building, "concrete": pair.concrete}
