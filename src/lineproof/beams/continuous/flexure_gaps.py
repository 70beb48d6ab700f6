"""Flexure where no given bars stand: what is needed there, no resistance, checks that fail.

The depth is that of the nearest bars, so that the steel required and the shear have one. The
concrete alone is not counted: the moment resistance of a section without bars is zero.
"""

from __future__ import annotations

from lineproof.beams.bars import BarLayer, BarLayers
from lineproof.beams.bottom_bars import bars_inside
from lineproof.beams.continuous.case_forces import record_forces
from lineproof.beams.continuous.faces import Face, faces_of, hogging
from lineproof.beams.continuous.flexure import (
    at_face,
    begin,
    nearer,
    record_demand,
    record_no_moment,
)
from lineproof.beams.continuous.model import Model
from lineproof.beams.flexure import required
from lineproof.beams.inputs import Shape
from lineproof.beams.steps import Steps
from lineproof.standards.a23_3 import bars, flexure
from lineproof.standards.references import MECHANICS

NO_BARS = (
    "No {face} bars stand here, as given along the beam. The tension that plain concrete takes is "
    "not counted: there is no moment resistance."
)
NEAREST = "the nearest to the middle of the span, where none stand"
ASSUMED = "none stand in this span: assumed for the depth alone"


def record_sag_gap(model: Model, span: int, beside: BarLayers, holder: str) -> None:
    """Record a span whose middle no bottom bars cross: steel required, no resistance.

    ``beside`` are the bars nearest to the middle; where the span has none, bars of the size
    ``holder`` are assumed for the depth.
    """
    sheet, inputs = model.sheet, model.inputs
    with sheet.part(f"sag-{span}-beside", f"Span {span}: depth to the bottom bars beside the gap"):
        place = begin(model, span, "b_w").place
        sheet.stand_for(place)
        layers, origin = (beside, NEAREST) if beside else ((BarLayer(2, holder),), ASSUMED)
        d = bars_inside(sheet, layers, stirrup=inputs.stirrup, origin=origin)
    demand = model.forces.sag(span)
    with sheet.part(f"sag-{span}", f"Span {span}: moment in the span"):
        steps = begin(model, span, "b_f" if inputs.slab else "b_w")
        near = nearer(model, demand)
        record_forces(steps, model, demand, near, x=at_face(model, demand, near))
        sheet.note("bars-text", "Bottom bars: none.", title="Bars")
        steps.bind(d=d)
        _fail(steps, inputs.shape, "bottom")


def record_hog_without(model: Model, support: int, holder: str) -> None:
    """Record the faces of a support that no top bars cross: those with tension at the top fail.

    ``holder`` is the size of bars assumed for the depth.
    """
    faces = [face for face in faces_of(model) if face.support == support]
    for face in sorted(faces, key=lambda face: -hogging(model, face)):
        with model.sheet.part(face.key, f"{face.name.capitalize()}: moment over the support"):
            if hogging(model, face) > 0:
                _record_face(model, face, holder)
            else:
                record_no_moment(model, face)


def _record_face(model: Model, face: Face, holder: str) -> None:
    sheet = model.sheet
    steps = begin(model, face.span, "b_w")
    record_demand(steps, model, face)
    steps.place.pop("h_f", None)
    sheet.note("bars-text", "Top bars: none.", title="Bars")
    steps.bind(
        d_bs=sheet.lookup("d_bs", bars.BARS, model.inputs.stirrup, "d_b"),
        d_b=sheet.lookup("d_b", bars.BARS, holder, title="bar assumed for the depth alone"),
    )
    steps.line(bars.DEPTH_ONE_LAYER)
    _fail(steps, "rectangular", "top")


def _fail(steps: Steps, shape: Shape, face: str) -> None:
    """Record the steel required against none, and the moment against no resistance."""
    sheet = steps.sheet
    sheet.note("no-bars", NO_BARS.format(face=face), title="Gap", basis=MECHANICS)
    required(steps, shape)
    steps.bind(A_s=sheet.given("A_s", "0 mm2", source="no bars stand here"))
    steps.check(flexure.ENOUGH_STEEL)
    steps.bind(M_r=sheet.given("M_r", "0 kN.m", source="no bars stand here"))
    steps.check(flexure.STRENGTH)
