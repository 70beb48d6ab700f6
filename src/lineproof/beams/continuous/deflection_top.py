"""Bars at midspan where they are not those of the section of the span's moment, recorded.

The top bars of spans that hog at midspan under service load, and given bottom bars that count
otherwise there than at the largest moment.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from lineproof.beams.continuous.deflection_service import Stage, StageMoments, deflection_key
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.developed import (
    Developed,
    bars_of,
    counted_in,
    developed_at,
    record_developed_bars,
    same,
)
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.layout import Face
from lineproof.beams.continuous.model import Model
from lineproof.record import Entry
from lineproof.standards.a23_3 import deflection, deflection_stages

_NOTE = (
    "Under service load the moment at midspan is negative and cracks the section: the top bars are "
    "in tension. Those count in full that reach past midspan by their development length to both "
    "sides; two bars lapped there count as one. Where bars reach less, their area counts in "
    "proportion."
)
_NOTE_BOTTOM = (
    "The bottom bars at midspan count otherwise than where the moment is largest: in proportion to "
    "the distance to their nearer end, in full from their development length on; two bars lapped "
    "there count as one."
)


def top_key(span: int) -> str:
    """Return the key of the part that holds the top bars at midspan of a span."""
    return deflection_key(span, "top")


def bottom_key(span: int) -> str:
    """Return the key of the part that holds the bottom bars at midspan of a span."""
    return deflection_key(span, "bottom")


def top_recorded(model: Model, span: int) -> Mapping[str, Entry] | None:
    """Return d and A_s of the top bars at midspan where they are recorded."""
    found = [part for part in model.sheet.parts if part.key == top_key(span)]
    return counted_in(found[0].entries) if found else None


def bottom_recorded(model: Model, span: int) -> Mapping[str, Entry]:
    """Return d and A_s of the bottom bars at midspan: their own, or those of the moment."""
    found = [part for part in model.sheet.parts if part.key == bottom_key(span)]
    if found:
        return counted_in(found[0].entries)
    return bars_of(model.sheet, f"sag-{span}")


def hogging_cracks(
    model: Model, span: int, moments: Mapping[Stage, StageMoments], earlier: float
) -> bool:
    """Tell whether hogging at midspan cracks the web at some stage; ``earlier`` moment included.

    That of an earlier stage counts where the span hogs at midspan at a later one.
    """
    f_r, b_w = (model.sheet.find(name).value for name in ("f_r", "b_w"))
    f_rd = deflection.F_R_DEFLECTION.function(f_r)
    h = span_place(model.sheet, model.inputs, span)["h"].value
    least = min(each.M_m for each in moments.values())
    if least >= 0:
        return False
    return -min(least, earlier) > deflection_stages.CRACKING_WEB.function(f_rd, b_w, h)


def record_top(design: Design, span: int) -> Mapping[str, Entry] | None:
    """Record the top bars that run through midspan of a span; None, and no part, without any."""
    counted = _at_midspan(design, span, "top")
    if not counted:
        return None
    title = f"Top bars at midspan of span {span}"
    return _record(design, span, counted, top_key(span), title, _NOTE)


def record_bottom(design: Design, span: int) -> None:
    """Record given bottom bars at midspan where others count than at the largest moment."""
    if design.model.inputs.bar_runs is None:
        return
    counted = _at_midspan(design, span, "bottom")
    at_most = design.bottom_counted(span)
    if counted and not same(counted, at_most):
        title = f"Bottom bars at midspan of span {span}"
        _record(design, span, counted, bottom_key(span), title, _NOTE_BOTTOM)


def _at_midspan(design: Design, span: int, face: Face) -> tuple[Developed, ...]:
    axes = design.outline.axes
    middle = (axes[span - 1] + axes[span]) / 2
    return developed_at(design.standing, face, middle)


def _record(
    design: Design, span: int, counted: Sequence[Developed], key: str, title: str, note: str
) -> Mapping[str, Entry]:
    return record_developed_bars(
        design.model, design.designed, counted, key=key, title=title, span=span, note=note,
        where="midspan",
    )  # fmt: skip
