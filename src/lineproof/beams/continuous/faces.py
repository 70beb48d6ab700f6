"""The faces of supports, and the spans with bottom bars, in tension or not."""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.beams.continuous.case_forces import NEAR
from lineproof.beams.continuous.forces import ENDS, Demand, End, other
from lineproof.beams.continuous.model import GIVEN, Model
from lineproof.beams.continuous.restraint import held_in_frame, restraint_moment
from lineproof.record import Entry
from lineproof.standards.a23_3 import analysis


@dataclass(frozen=True, slots=True)
class Face:
    """A face of a support, in the span it belongs to."""

    support: int
    side: End

    @property
    def span(self) -> int:
        """The span that the face belongs to."""
        return self.support - 1 if self.side == "left" else self.support

    @property
    def near(self) -> End:
        """The end of that span at which it lies."""
        return other(self.side)

    @property
    def key(self) -> str:
        """Key of its part."""
        return f"hog-{self.support}-{self.side}"

    @property
    def across(self) -> str:
        """Key of the part of the other face of its support."""
        return Face(self.support, other(self.side)).key

    @property
    def name(self) -> str:
        """Its name in words."""
        return f"support {self.support}, {self.side} face"


def faces_of(model: Model) -> list[Face]:
    """Return all faces of the beam from left to right."""
    return [
        Face(support, side)
        for support in range(1, model.spans + 2)
        for side in ENDS
        if model.forces.has_span(support, side)
    ]


def sagging_spans(model: Model) -> list[int]:
    """Return the spans whose bottom bars have a section of their own: all but cantilevers."""
    return [k for k in range(1, model.spans + 1) if not model.forces.beam.cantilever(k)]


def has_sag(model: Model, span: int) -> bool:
    """Tell whether any load case brings tension to the bottom of a span.

    None does in a short span between long ones.
    """
    return model.forces.sag(span).M > 0


def nominally_simple(model: Model, face: Face) -> bool:
    """Tell whether an end support is analysed as simple: not where an imported frame holds it."""
    kind = model.inputs.supports[face.support - 1].kind
    simple = kind == "simple" and face.support in (1, model.spans + 1) and not _hung(model, face)
    return simple and not held_in_frame(model, face.support, face.span)


def restrained_supports(model: Model) -> frozenset[int]:
    """Return the end supports whose top bars are designed for an assumed restraint."""
    return frozenset(
        face.support
        for face in faces_of(model)
        if nominally_simple(model, face) and restraint_moment(model, face.support, face.span) > 0
    )


def _hung(model: Model, face: Face) -> bool:
    """Tell whether the span of a face is a cantilever."""
    return model.forces.beam.cantilever(face.span)


def hogging(model: Model, face: Face) -> float:
    """Return the design moment of a face, top in tension; at most 0 where there is none [N.mm]."""
    if nominally_simple(model, face):
        return restraint_moment(model, face.support, face.span)
    return -model.forces.hog(face.support, face.side).M


def nearer(model: Model, demand: Demand) -> End:
    """Return the end of its span that a demand stands nearer to."""
    half = model.lengths[demand.span - 1].value / 2
    return "left" if demand.x <= half * (1 + 1e-9) else "right"


def at_face(model: Model, demand: Demand, near: End, symbol: str = "") -> Entry | None:
    """Record the distance of the near face, if the largest moment of the span stands there.

    Beside a span that is loaded far more, the shear is nowhere zero between the faces.
    """
    start, end = model.forces.beam.faces(demand.span)
    if model.imported is not None or abs(demand.x - (start if near == "left" else end)) > NEAR:
        return None
    support = demand.span if near == "left" else demand.span + 1
    b_sn = model.sheet.entry(f"{GIVEN}/b_s{support}")
    return model.sheet.line(analysis.TO_FACE, symbol=symbol, b_sn=b_sn)
