"""The figure of deflected shapes: what stands on the sheet, bent by curvature along the spans."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

from lineproof.beams.continuous.deflection import (
    Behind,
    Place,
    SpanSection,
    deflections,
)
from lineproof.beams.continuous.deflection_hinges import stiffness_checks
from lineproof.beams.continuous.deflection_service import (
    Stage,
    StageMoments,
    deflection_key,
    free_end,
    span_behind,
)
from lineproof.beams.continuous.deflection_shapes import deflected_shapes
from lineproof.beams.continuous.deflection_top import bottom_recorded, top_recorded
from lineproof.beams.continuous.deflections import history_of, service_of, top_at
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.figure_deflection import (
    DeflectionCurve,
    DeflectionPiece,
    deflection_figure,
)
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.model import Model
from lineproof.drawing import Figure
from lineproof.errors import UserError
from lineproof.record import Entry

MIDSPAN, TIP = "at midspan", "at the free end of a cantilever"
CHECKED = (
    "Values here: the largest of a span, by the curvature of every section. Values of the checks: "
    "{}, by one effective moment of inertia."
)
UNCHECKED = (
    "A span that has the least depth (9.8.2.1) has no check of its deflection: no limit applies to "
    "the values here."
)
_NAMES = ("immediate, dead and live load", "after attachment", "total, long term")


def deflection_shapes_figure(design: Design) -> Figure | None:
    """Return the figure, or None where deflections are not calculated for every span."""
    model = design.model
    spans = range(1, model.spans + 1)
    if model.inputs.forces_file is not None or any(stiffness_checks(model.sheet, k) for k in spans):
        return None
    pieces: dict[str, list[DeflectionPiece]] = {name: [] for name in _NAMES}
    behind: dict[int, Behind] = {}
    order = sorted(range(1, model.spans + 1), key=model.forces.beam.cantilever)
    found: dict[int, tuple[DeflectionPiece, ...]] = {}
    for span in order:
        try:
            found[span] = _pieces(design, span, behind)
        except UserError:
            return None
    for span in range(1, model.spans + 1):
        for name, piece in zip(_NAMES, found[span], strict=True):
            pieces[name].append(piece)
    curves = [DeflectionCurve(name, pieces[name]) for name in _NAMES]
    caption = "Deflected shapes, by curvature along the spans, for information"
    return deflection_figure(design.outline, curves, caption, _notes(model))


def _notes(model: Model) -> list[str]:
    """Say how the values of the figure differ from those that the checks compare."""
    checked = [
        any(e.kind == "check" and name.startswith("deflection") for name, e in made.items())
        for made in (
            model.sheet.entries_of(deflection_key(span)) for span in range(1, model.spans + 1)
        )
    ]
    tips = [free_end(model.forces.beam, span) for span in range(1, model.spans + 1)]
    places = [
        place
        for place, at in ((MIDSPAN, False), (TIP, True))
        if any(told and bool(tip) is at for told, tip in zip(checked, tips, strict=True))
    ]
    said = [CHECKED.format(" and ".join(places))] if places else []
    return [*said, *([] if all(checked) else [UNCHECKED])]


def bent_of(
    model: Model, span: int, behind: Mapping[int, Behind]
) -> tuple[SpanSection, dict[Stage, StageMoments]]:
    """Return what bends in a span and its service moments at every stage, from the sheet."""
    service = service_of(model, span)
    before = _earlier(model, span)
    moments = {stage: replace(each, earlier=before) for stage, each in service.stages.items()}
    return _section(model, span, behind), moments


def _pieces(design: Design, span: int, behind: dict[int, Behind]) -> tuple[DeflectionPiece, ...]:
    model = design.model
    section, moments = bent_of(model, span, behind)
    made = deflections(section, moments, carries=model.inputs.carries, history=history_of(model))
    behind[span] = Behind.of(section.l, made)
    shapes = deflected_shapes(section, moments, made)
    x = (shapes.x + design.outline.axes[span - 1]).tolist()
    return tuple(
        DeflectionPiece(span, x, w.tolist())
        for w in (shapes.immediate, shapes.attached, shapes.total)
    )


def _earlier(model: Model, span: int) -> tuple[float, float, float]:
    """Return the recorded moments of a construction stage: at midspan, left, right [N.mm]."""
    key = deflection_key(span, "construction")
    entries = next((part.entries for part in model.sheet.parts if part.key == key), {})
    values = [entries[n].value if n in entries else 0.0 for n in ("M_aem", "M_ae1", "M_ae2")]
    return values[0], values[1], values[2]


def _section(model: Model, span: int, behind: Mapping[int, Behind]) -> SpanSection:
    sheet, find = model.sheet, model.sheet.find
    place = {n: e.value for n, e in span_place(sheet, model.inputs, span).items()}
    free = free_end(model.forces.beam, span)
    b_w = find("b_w").value
    midspan = None
    if not free:
        midspan = _place(place.get("b_f", b_w), bottom_recorded(model, span))
    before = span_behind(model.forces.beam, span) if free else None
    return SpanSection(
        place["l"], place["l_n"], place["h"], b_w,
        find("h_f").value if model.inputs.slab else 0.0, place["I_g"], place["y_b"],
        find("f_r").value, find("E_c").value, find("E_s").value, midspan,
        _top(model, b_w, span, "right"), _top(model, b_w, span + 1, "left"), free,
        None if before is None else behind[before], _place(b_w, top_recorded(model, span)),
    )  # fmt: skip


def _top(model: Model, b_w: float, support: int, side: str) -> Place | None:
    return _place(b_w, top_at(model, support, side))


def _place(b_w: float, bound: Mapping[str, Entry] | None) -> Place | None:
    """Return a section; without bars, which no deflection is computed for, where it binds none."""
    if bound is None:
        return None
    return Place(b_w, bound["d"].value, bound["A_s"].value) if bound else Place(b_w, 0.0, 0.0)
