"""Cover of a beam of any number of spans, for its thickest bar."""

from __future__ import annotations

from collections.abc import Iterable

from lineproof.beams.basics import COVER, cover_inside
from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.steps import Steps
from lineproof.sheet import Sheet
from lineproof.standards.a23_3.bars import BARS


def record_cover(sheet: Sheet, inputs: ContinuousInputs, sizes: Iterable[str]) -> None:
    """Record cover for durability and fire of the stirrups and of the thickest of these bars."""
    thickest = max(sizes, key=lambda size: BARS.number(size, "d_b"))
    with sheet.part(COVER, "Cover for durability and fire"):
        place = {
            "d_bs": sheet.lookup("d_bs", BARS, inputs.stirrup, "d_b"),
            "d_b": sheet.lookup("d_b", BARS, thickest, title="diameter of the thickest bar"),
        }
        cover_inside(Steps(sheet, place), inputs)
