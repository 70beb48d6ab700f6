"""Stress of the bars under specified loads, for crack control where its allowance does not do.

Largest moment of the service combinations of NBC 4.1.3.4 at the section, live load arranged as for
strength, elastic: not redistributed. Where moments are brought in, no case is of specified loads.
"""

from __future__ import annotations

from lineproof.beams.continuous.case_forces import record_specified_moment
from lineproof.beams.continuous.faces import Face, at_face, hogging, nearer, nominally_simple
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.restraint import record_specified_restraint
from lineproof.beams.cracks import Stress, stress_inside
from lineproof.beams.steps import Steps
from lineproof.record import Entry


def specified_sag(model: Model, span: int) -> dict[str, float]:
    """Return M_s [N.mm], the largest of a span; nothing where there is none to calculate with."""
    specified = model.specified
    M_s = 0.0 if specified is None else specified.forces.sag(span).M
    return {"M_s": M_s} if M_s > 0 else {}


def specified_hog(model: Model, face: Face) -> dict[str, float]:
    """Return M_s [N.mm] of a face, top in tension; nothing where there is none."""
    specified = model.specified
    M_s = 0.0 if specified is None else hogging(specified, face)
    return {"M_s": M_s} if M_s > 0 else {}


def sag_stress(model: Model, span: int, A_s: Entry) -> Stress | None:
    """Return what records the stress of the bars ``A_s`` at the largest moment of a span."""
    specified = model.specified
    if specified is None or not specified_sag(model, span):
        return None

    def record(steps: Steps) -> None:
        demand = specified.forces.sag(span)
        near = nearer(specified, demand)
        x = at_face(specified, demand, near, symbol="x_q")
        record_specified_moment(steps, specified, demand, near, x=x)
        stress_inside(steps, A_s)

    return record


def face_stress(model: Model, face: Face, A_s: Entry) -> Stress | None:
    """Return what records the stress of the bars ``A_s`` at a face of a support."""
    specified = model.specified
    if specified is None or not specified_hog(model, face):
        return None

    def record(steps: Steps) -> None:
        if nominally_simple(model, face):
            record_specified_restraint(steps, specified, face.support, face.span)
        else:
            demand = specified.forces.hog(face.support, face.side)
            x = steps.entry("x_f")
            record_specified_moment(steps, specified, demand, face.near, x=x)
        stress_inside(steps, A_s)

    return record
