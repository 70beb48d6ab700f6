"""The chapter on anchorage: what the detailing of bars rests on, taken from the other chapters."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.beams.continuous.anchorage_record import Writers, shear_as_given
from lineproof.beams.continuous.case_forces import record_forces
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.detailing_record import record_detailing
from lineproof.beams.continuous.forces import Demand, End
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.resistance_record import COVERAGE
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.record import Entry

__all__ = ["COVERAGE", "record_anchorage"]


def record_anchorage(design: Design) -> None:
    """Record development, hooks, cut-off points, laps and coverage of the bars as laid."""
    model = design.model

    def span(number: int) -> Mapping[str, Entry]:
        return span_place(model.sheet, model.inputs, number)

    def forces(steps: Steps, demand: Demand, near: End, x: Entry | None = None) -> None:
        record_forces(steps, model, demand, near, x=x)

    writers = Writers(model.sheet, design.designed, span, forces, shear_as_given)
    coverage = record_detailing(writers, design.runs)
    if not coverage.holds and model.inputs.bar_runs is None:
        raise UserError([f"bars: {gap}" for gap in coverage.gaps])
