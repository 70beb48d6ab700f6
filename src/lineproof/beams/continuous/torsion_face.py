"""Torsion at the face of a support as recorded lines, for the bars that are anchored there."""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.forces import Demand, End
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.imported_torsion import record_imported_torsion
from lineproof.beams.continuous.shear_sections import torques_of
from lineproof.beams.continuous.torsion_record import record_torsion, section_of_torsion
from lineproof.beams.steps import Steps


@dataclass(frozen=True, slots=True)
class AtFace:
    """A section at the face of a support, as the lines of its torsion need it."""

    torques: tuple[tuple[str, float, float], ...]
    compatibility: bool
    cantilever: bool
    place: str = "face"


def record_torsion_at_face(design: Design, steps: Steps, demand: Demand, near: End) -> None:
    """Record inside the open part the torsion of a case at a face; bind T_f, p_h and A_o.

    Needs what the part on the torsion of the span holds: run the shear first.
    """
    model, span = design.model, demand.span
    check = design.stirrups.checks[span - 1]
    acting = check.state.numbers.torsion
    if acting is None:
        return
    place = dict(steps.place)
    place |= {"l_n": span_place(model.sheet, model.inputs, span)["l_n"]}
    turned = Steps(model.sheet, place | section_of_torsion(model.sheet, span, acting))
    if model.imported is not None and model.imported.has_torsion(span):
        record_imported_torsion(turned, model.imported, demand, near)
    cantilever = design.designed.cantilever(span)
    torques = torques_of(check, model.forces, demand.row)
    record_torsion(turned, check.state.basis, AtFace(torques, acting.compatibility, cantilever))
    steps.bind(**{name: turned.entry(name) for name in ("T_f", "p_h", "A_o")})
