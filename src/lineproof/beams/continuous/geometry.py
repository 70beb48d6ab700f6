"""Geometry of each span: clear length, effective flange, gross section, cracking moments."""

from __future__ import annotations

from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.continuous.loads import one_depth
from lineproof.beams.continuous.model import GIVEN, span_key
from lineproof.beams.section import record_gross
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import analysis, flange

_GEOMETRY = (
    "l_n", "b_o", "b_f", "l_w", "A_g", "y_b", "y_t", "I_g", "M_cr", "M_crn",
)  # fmt: skip


def record_spans(sheet: Sheet, inputs: ContinuousInputs) -> None:
    """Record a part for every span."""
    for span in range(1, len(inputs.spans) + 1):
        _record_span(sheet, inputs, span)


def typed_place(sheet: Sheet, inputs: ContinuousInputs, span: int) -> dict[str, Entry]:
    """Return what l, h and the widths of its supports stand for in a span."""
    given = sheet.entries_of(GIVEN)
    place = {
        "l": given[f"l_{span}"],
        "h": given["h"] if one_depth(inputs) else given[f"h_{span}"],
    }
    sides = (("b_sl", span), ("b_sr", span + 1))
    return place | {name: given[f"b_s{j}"] for name, j in sides if f"b_s{j}" in given}


def span_place(sheet: Sheet, inputs: ContinuousInputs, span: int) -> dict[str, Entry]:
    """Return what the symbols of a span's geometry stand for; run the spans first."""
    made = sheet.entries_of(span_key(span))
    place = typed_place(sheet, inputs, span)
    return place | {name: made[name] for name in _GEOMETRY if name in made}


def _record_span(sheet: Sheet, inputs: ContinuousInputs, span: int) -> None:
    supports = inputs.supports[span - 1], inputs.supports[span]
    with sheet.part(span_key(span), f"Span {span}: clear length and section"):
        sheet.stand_for(typed_place(sheet, inputs, span))
        if supports[0].kind == "free":
            sheet.line(analysis.CLEAR_FROM_RIGHT)
        elif supports[1].kind == "free":
            sheet.line(analysis.CLEAR_FROM_LEFT)
        else:
            sheet.line(analysis.CLEAR_SPAN)
        if inputs.slab:
            _record_flange(sheet, inputs)
        record_gross(sheet, inputs.shape)


def _record_flange(sheet: Sheet, inputs: ContinuousInputs) -> None:
    sheet.line(flange.CLEAR_DISTANCE)
    if inputs.shape == "L":
        sheet.line(flange.OVERHANG_L)
        sheet.line(flange.WIDTH_L)
        return
    sheet.line(flange.OVERHANG_T_CONTINUOUS if continuous(inputs) else flange.OVERHANG_T_SIMPLE)
    sheet.line(flange.WIDTH_T)


def continuous(inputs: ContinuousInputs) -> bool:
    """Tell whether the beam is more than one simply supported span."""
    return len(inputs.spans) > 1 or any(s.kind in ("fixed", "elastic") for s in inputs.supports)
