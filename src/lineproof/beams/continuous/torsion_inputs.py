"""Torque along each span, and what resists it."""

from __future__ import annotations

from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.torsion import SpanTorsion
from lineproof.standards.a23_3.bars import BARS

PER_METRE = 1000.0
"""Torques are typed per metre of beam."""


def span_torsion(model: Model, designed: Designed, span: int) -> SpanTorsion | None:
    """Return torque and section of a span; None where no torque is given or imported."""
    inputs, find = model.inputs, model.sheet.find
    imported = model.imported is not None and model.imported.has_torsion(span)
    if not inputs.torques and not imported:
        return None
    outline = designed.outline
    sides = {"T": 2, "L": 1, "rectangular": 0}[outline.shape]
    overhang = (outline.widths[span - 1] - outline.b_w) / sides if sides else 0.0
    return SpanTorsion.of(
        {kind: typed.value / PER_METRE for kind, typed in inputs.torques.items()},
        compatibility=inputs.torsion == "compatibility",
        d_b=BARS.number(corner_bar(designed, span), "d_b"),
        shape=outline.shape,
        b_w=outline.b_w,
        h=outline.depths[span - 1],
        h_f=outline.h_f,
        b_o=overhang,
        cover=outline.cover,
        stirrup=inputs.stirrup,
        f_c=find("f_c").value,
        lambda_=find("lambda_").value,
        phi_c=find("phi_c").value,
    )


def corner_bar(designed: Designed, span: int) -> str:
    """Return the size of the thinnest bar in a corner of the stirrups of a span."""
    layers = [*designed.bars.bottom[span - 1][:1]]
    sizes = [designed.bars.holders]
    layers += [top.web[0] for top in designed.bars.top[span - 1 : span + 1] if top.web]
    sizes += [group.size for layer in layers for group in layer.groups]
    return min(sizes, key=lambda size: BARS.number(size, "d_b"))
