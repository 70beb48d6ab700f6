"""Stretches of an elevation in which the bars of a face are not enough: hatched, with their place.

Heights on paper are in mm.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from lineproof.beams.continuous.figure_elevation_view import View
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.drawing import THIN, Polyline, Shape, Text, words
from lineproof.drawing.metrics import text_width
from lineproof.drawing.paper import FIT_MARGIN

BAND = 1.5
"""Height of the hatching inside the face of the concrete."""
SIZE = 2.3
NOTE = "Hatched: not enough bars at that face, or none that count; m from the left axis of the span"


@dataclass(frozen=True, slots=True)
class Short:
    """A stretch of a span between two stations along the beam [mm] and what is written there."""

    face: Face
    span: int
    start: float
    end: float
    text: str

    def bounded_by(self, run: BarRun, end: float) -> bool:
        """Tell whether bars end or begin in it."""
        return run.face == self.face and self.start <= end <= self.end


def shown(view: View, stretches: Sequence[Short]) -> list[Short]:
    """Return the stretches of the spans shown."""
    return [each for each in stretches if each.span in view.spans]


def gap_shapes(view: View, stretches: Sequence[Short]) -> list[Shape]:
    """Hatch the stretches along their face; their places stand beside it where they fit."""
    shapes: list[Shape] = []
    for each in shown(view, stretches):
        depth = view.outline.depths[each.span - 1]
        edge, inward = (0.0, -1.0) if each.face == "top" else (-depth, 1.0)
        inner = edge + inward * view.mm(BAND)
        corners = ((each.start, edge), (each.end, edge), (each.end, inner), (each.start, inner))
        shapes.append(Polyline(corners, weight=THIN, closed=True, fill="hatch"))
        if _fits(view, each):
            at = (each.start + each.end) / 2, inner + inward * view.mm(SIZE / 2 + 0.6)
            shapes.append(Text(at, words(each.text), "text", SIZE))
    return shapes


def _fits(view: View, each: Short) -> bool:
    """Tell whether the place stands beside the hatching."""
    width = text_width(words(each.text), SIZE) + FIT_MARGIN
    return width <= (each.end - each.start) * view.scale


def gap_notes(view: View, stretches: Sequence[Short], size: float, room: float) -> list[str]:
    """Return the note on what is hatched, with the places that do not stand beside it, in lines.

    ``size`` of the text and ``room`` of a line are in mm on paper.
    """
    hatched = shown(view, stretches)
    if not hatched:
        return []
    places = [
        f"{each.face} of span {each.span}, {each.text}" for each in hatched if not _fits(view, each)
    ]
    text = f"{NOTE}: {'; '.join(places)}." if places else f"{NOTE}."
    lines = [""]
    for word in text.split():
        longer = f"{lines[-1]} {word}".strip()
        if text_width(words(longer), size) <= room:
            lines[-1] = longer
        else:
            lines.append(word)
    return lines
