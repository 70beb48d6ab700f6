"""The chapter on anchorage: what the detailing of bars rests on, taken from the other chapters."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.beams.continuous.anchorage_record import Writers
from lineproof.beams.continuous.case_forces import record_forces
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.detailing_record import record_detailing, record_lengths_and_ends
from lineproof.beams.continuous.forces import Demand, End
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.shear_further import record_further
from lineproof.beams.continuous.torsion_face import record_torsion_at_face
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.record import Entry


def record_anchorage(design: Design) -> None:
    """Record development, hooks, cut-off points, laps and coverage of the bars as laid."""
    coverage = record_detailing(_writers(design), design.runs)
    if not coverage.holds and not design.model.inputs.bars_given:  # bars given fail their checks
        raise UserError(
            [
                f"bars: {gap}; write a deeper or wider beam, or the bars themselves as bar_runs"
                for gap in coverage.gaps
            ]
        )


def record_ends(design: Design) -> None:
    """Record development, hooks, cut-off points and laps alone, not the coverage."""
    record_lengths_and_ends(_writers(design), design.runs)


def _writers(design: Design) -> Writers:
    """Return what the detailing is recorded by: spans, forces, shear, torsion."""
    model = design.model

    def span(number: int) -> Mapping[str, Entry]:
        return span_place(model.sheet, model.inputs, number)

    def forces(steps: Steps, demand: Demand, near: End, x: Entry | None = None) -> None:
        record_forces(steps, model, demand, near, x=x)

    def torsion(steps: Steps, demand: Demand, near: End) -> None:
        record_torsion_at_face(design, steps, demand, near)

    def section(number: int, row: int, column: int, key: str) -> Mapping[str, Entry]:
        return record_further(design, number, (row, column), key)

    return Writers(model.sheet, design.designed, span, forces, torsion=torsion, section=section)
