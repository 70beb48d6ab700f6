"""Torque along each span, and what resists it."""

from __future__ import annotations

from collections.abc import Iterable
from itertools import pairwise

from lineproof.beams.continuous.anchorage import sides_of
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.torsion import SpanTorsion
from lineproof.standards.a23_3.bars import BARS

CORNERS = 2
PER_METRE = 1000.0
"""Torques are typed per metre of beam."""


def span_torsion(
    model: Model, designed: Designed, span: int, runs: Iterable[BarRun]
) -> SpanTorsion | None:
    """Return torque and section of a span; None where no torque is given or imported.

    ``runs`` are the bars along the beam.
    """
    inputs, find = model.inputs, model.sheet.find
    imported = model.imported is not None and model.imported.has_torsion(span)
    if not inputs.torques and not imported:
        return None
    outline = designed.outline
    sides = sides_of(outline)
    overhang = (outline.widths[span - 1] - outline.b_w) / sides if sides else 0.0
    return SpanTorsion.of(
        {kind: typed.value / PER_METRE for kind, typed in inputs.torques.items()},
        compatibility=inputs.torsion == "compatibility",
        d_b=BARS.number(corner_bar(model, designed, span, runs), "d_b"),
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


def corner_bar(model: Model, designed: Designed, span: int, runs: Iterable[BarRun]) -> str:
    """Return the size of the thinnest bar in a corner of the stirrups of a span.

    Given bars are those that stand along the span, the two thickest of a first layer in its
    corners.
    """
    kept = tuple(runs)
    sizes = _given_corners(designed, span, kept) if model.inputs.bar_runs is not None else ()
    return min(sizes or _corners(designed, span), key=_diameter)


def _given_corners(designed: Designed, span: int, runs: tuple[BarRun, ...]) -> tuple[str, ...]:
    """Return the sizes of given bars in the corners of the stirrups, stretch by stretch."""
    start, end = designed.outline.faces(span)
    made: list[str] = []
    for face in ("bottom", "top"):
        own = [r for r in runs if (r.face, r.place, r.layer) == (face, "web", 1)]
        ends = {start, end, *(x for r in own for x in (r.start, r.end) if start < x < end)}
        for a, b in pairwise(sorted(ends)):
            there = (r for r in own if r.start <= a and r.end >= b)
            sizes = sorted((r.size for r in there for _ in range(r.number)), key=_diameter)
            made += sizes[-CORNERS:]
    return tuple(made)


def _corners(designed: Designed, span: int) -> tuple[str, ...]:
    """Return the sizes of the bars of sections that may stand in the corners of the stirrups."""
    layers = [*designed.bars.bottom[span - 1][:1]]
    layers += [top.web[0] for top in designed.bars.top[span - 1 : span + 1] if top.web]
    return (designed.bars.holders, *(layer.size for layer in layers))


def _diameter(size: str) -> float:
    return BARS.number(size, "d_b")
