"""Cover of a beam of any number of spans, for its thickest bar."""

from __future__ import annotations

from collections.abc import Iterable

from lineproof.beams.basics import COVER, cover_inside
from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.continuous.layout import BarRun, BeamOutline
from lineproof.beams.steps import Steps
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import cover
from lineproof.standards.a23_3.bars import BARS


def record_cover(
    sheet: Sheet, inputs: ContinuousInputs, sizes: Iterable[str], outline: BeamOutline
) -> None:
    """Record cover for durability and fire of the stirrups and of the thickest of these bars.

    Bars given along the beam are covered at their ends as well; those laid here always are.
    """
    thickest = max(sizes, key=lambda size: BARS.number(size, "d_b"))
    with sheet.part(COVER, "Cover for durability and fire"):
        place = {
            "d_bs": sheet.lookup("d_bs", BARS, inputs.stirrup, "d_b"),
            "d_b": sheet.lookup("d_b", BARS, thickest, title="diameter of the thickest bar"),
        }
        steps = Steps(sheet, place)
        cover_inside(steps, inputs)
        if inputs.bar_runs:
            text = f"{end_cover_of(outline, inputs.bar_runs):.12g} mm"
            steps.bind(c_end=sheet.given("c_end", text, source="least of the bars as given"))
            steps.check(cover.ENDS_COVERED)


def end_cover_of(outline: BeamOutline, runs: Iterable[BarRun]) -> float:
    """Return the least concrete outside of the ends of bars, at both ends of the beam [mm]."""
    low, high = outline.ends
    return min(min(run.start - low, high - run.end) for run in runs)
