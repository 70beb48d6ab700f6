"""An existing beam whose given bars leave gaps, for the tests of gaps and of what cures them.

Two spans of 6 m on walls and a column, 400 x 500 mm, 30 MPa, 400R, stirrups below the minimum.
Bottom bars 4-20M stop at 2.30 m and begin again at 3.00 m; the top bars 3-25M over the column reach
0.90 m to each side of its axis, where 2-15M follow.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Any

from lineproof import beams
from lineproof.beams.continuous.resistance_cover import Gap, covered
from lineproof.record import Record
from lineproof.sheet import Sheet

from .flow import run, start, without_cures

Row = dict[str, Any]
EXISTING: dict[str, Any] = {
    "spans": ["6 m", "6 m"],
    "supports": ["wall 300 mm", "column 400 mm", "wall 300 mm"],
    "h": "500 mm", "b_w": "400 mm", "h_f": None, "shape": "rectangular", "spacing": "3 m",
    "f_c": "30 MPa", "superimposed": "1.0 kPa", "floor_weight": "4.0 kPa", "use": "office",
    "live_load": "4.8 kPa", "stirrups": [], "shear_method": "simplified",
}  # fmt: skip


def row(face: str, bars: str, start_at: float, end: float, **more: Any) -> Row:
    """One run of bars as a designer types it, in m."""
    return {"face": face, "bars": bars, "start": f"{start_at} m", "end": f"{end} m", **more}


LEFT, RIGHT = row("bottom", "4-20M", -0.1, 2.3), row("bottom", "4-20M", 3.0, 12.1)
OVER = row("top", "3-25M", 5.1, 6.9)
BESIDE = [row("top", "2-15M", -0.1, 5.1), row("top", "2-15M", 6.9, 12.1)]
RUNS = [LEFT, RIGHT, OVER, *BESIDE]
# Lengths over which the bars are developed, 12.2.3 without minimum stirrups (the longer
# expression): 0.6*k1*k2*k3*k4*f_y/sqrt(f_c)*d_b; 20M: k4 = 0.8; top bars: k1 = 1.3.
L_20 = 0.6 * 0.8 * 400 / math.sqrt(30) * 19.5  # 683.6 mm
L_25_TOP = 0.6 * 1.3 * 400 / math.sqrt(30) * 25.2  # 1435.5 mm
STRESS = (0.85 - 0.0015 * 30) * 0.65 * 30  # alpha_1*phi_c*f_c, 15.70 MPa
D_BOTTOM = 500 - 30 - 11.3 - 19.5 / 2  # 448.95 mm
D_TOP = 500 - 30 - 11.3 - 25.2 / 2  # 446.1 mm


def built(
    runs: Sequence[Row] = RUNS, *, cures: bool = False, **changes: Any
) -> tuple[beams.ContinuousBeam, Sheet]:
    """The existing beam, with all its chapters; what would cure its failing checks if asked for."""
    beam = start(**(EXISTING | changes), bar_runs=list(runs))
    beam = beam if cures else without_cures(beam)
    return beam, run(beam)


def gaps_of(beam: beams.ContinuousBeam) -> tuple[Gap, ...]:
    """The gaps in its bars."""
    return covered(beam.design.designed, beam.design.runs).gaps


Existing = tuple[beams.ContinuousBeam, Sheet, Record]


def cure(sheet: Sheet, part: str) -> str:
    """What a part says that would cure its failing checks."""
    entries = sheet.entries_of(part).values()
    return " ".join(str(e.source.text) for e in entries if e.symbol.startswith("cure-"))


def swapped(old: Row, new: Row) -> list[Row]:
    """The bars of the beam with one run replaced."""
    return [new if each is old else each for each in RUNS]
