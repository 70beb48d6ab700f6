"""Flexure where no given bars stand: what is needed there, no resistance, checks that fail.

The depth is that of the nearest bars, so that the steel required and the shear have one. The
concrete alone is not counted: the moment resistance of a section without bars is zero.
"""

from __future__ import annotations

from lineproof.beams.bars import BarLayer, BarLayers
from lineproof.beams.bottom_bars import bars_inside
from lineproof.beams.continuous.layout import Face
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars
from lineproof.standards.references import MECHANICS

NO_BARS = (
    "No {face} bars stand here, as given along the beam. The tension that plain concrete takes is "
    "not counted: there is no moment resistance."
)
NEAREST = "the nearest to the largest moment of the span, where none stand"
ASSUMED = "none stand in this span: assumed for the depth alone"


def record_depth_beside(sheet: Sheet, stirrup: str, beside: BarLayers, holder: str) -> Entry:
    """Record inside the open part the depth to bottom bars beside a gap; return it.

    ``beside`` are the nearest bars; where the span has none, bars of the size ``holder`` are
    assumed.
    """
    layers, origin = (beside, NEAREST) if beside else ((BarLayer(2, holder),), ASSUMED)
    return bars_inside(sheet, layers, stirrup=stirrup, origin=origin)


def record_depth_assumed(steps: Steps, stirrup: str, holder: str) -> None:
    """Record inside the open part the depth to top bars of the size ``holder``, assumed."""
    steps.bind(
        d_bs=steps.sheet.lookup("d_bs", bars.BARS, stirrup, "d_b"),
        d_b=steps.sheet.lookup(
            "d_b", bars.BARS, holder, title="bar assumed for the depth alone"
        ),
    )  # fmt: skip
    steps.line(bars.DEPTH_ONE_LAYER)


def note_none(sheet: Sheet, face: Face) -> None:
    """Record inside the open part that no bars of a face stand here."""
    sheet.note("bars-text", f"{face.capitalize()} bars: none.", title="Bars")


def note_gap(sheet: Sheet, face: Face) -> None:
    """Record inside the open part that no bars of a face stand where they are needed."""
    note_none(sheet, face)
    sheet.note("no-bars", NO_BARS.format(face=face), title="Gap", basis=MECHANICS)


def no_steel(sheet: Sheet) -> Entry:
    """Record that the area of the bars is none; return it."""
    return sheet.given("A_s", "0 mm2", source="no bars stand here")


def no_resistance(sheet: Sheet) -> Entry:
    """Record that the moment resistance is none; return it."""
    return sheet.given("M_r", "0 kN.m", source="no bars stand here")
