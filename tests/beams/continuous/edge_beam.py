"""The edge beam of the notebooks, for the tests of torsion in the whole flow."""

from __future__ import annotations

from typing import Any

from lineproof import beams
from lineproof.beams.continuous.design import Design
from lineproof.record import Entry, Record
from lineproof.sheet import Sheet

from .flow import PROJECT, run
from .notebooks import EDGE_BEAM, inputs_of

TURNED: dict[str, Any] = {
    "torques": {"D": "15 kN.m"}, "torsion": "equilibrium", "closed_stirrups": True,
}  # fmt: skip


Edge = tuple[beams.ContinuousBeam, Design, Record]
"""A beam with all its chapters recorded, its design and its record."""


def make(beam: beams.ContinuousBeam) -> Edge:
    """Return a beam with all its chapters recorded, its design and its record."""
    sheet = run(beam)
    return beam, beam.design, sheet.close()


def edge(**changes: Any) -> beams.ContinuousBeam:
    """Start the beam of the notebook with some inputs changed."""
    sheet = Sheet("B12", "Edge beam", project=PROJECT)
    return beams.continuous_beam(sheet, **(inputs_of(EDGE_BEAM) | changes))


def failing(sheet: Sheet) -> list[str]:
    """Return the checks that do not hold."""
    return [e.id for part in sheet.parts for e in part.entries.values() if _fails(e)]


def _fails(entry: Entry) -> bool:
    return entry.kind == "check" and not entry
