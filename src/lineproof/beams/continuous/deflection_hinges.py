"""Places at which service moments crack a section in which no bars stand: hinges.

A span with one has no stiffness there and is given no deflection. The moments of the spans
continuous with it were found without the hinge, so that these are given none either. The loads
that deflect another span most are looked at too: they may crack this one, and it bends that one.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Any

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.analysis.solve import Row
from lineproof.beams.continuous.anchorage import value
from lineproof.beams.continuous.anchorage_record import plain
from lineproof.beams.continuous.deflection_record import WORDS
from lineproof.beams.continuous.deflection_service import ServiceMoments, deflection_key
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.layout import Face
from lineproof.beams.continuous.model import LOADS, Model
from lineproof.beams.continuous.resistance import provide
from lineproof.beams.continuous.resistance_cover import FACES
from lineproof.beams.continuous.service import BUILDING, record_at
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import deflection as clause
from lineproof.standards.a23_3 import deflection_stages as stages
from lineproof.standards.references import MECHANICS

STATIONS = 201
"""Evenly spaced stations of a span that are looked at, besides the ends of its bars."""
ROUND_OFF = 1e-9
_NOTE = (
    "Under this moment the concrete cracks where no bars count: nothing bends there but a hinge. "
    "No deflection is given, and the span does NOT hold; bars that cross the crack are needed."
)
_BESIDE = (
    "Span {hinge} has no stiffness where it cracks without bars, and this span is continuous with "
    "it: the moments here were found without that hinge and are no longer those of the beam. No "
    "deflection is given, and the span does NOT hold."
)
_TITLE = (
    "Span {hinge}, with which this span is continuous: moment beyond that of cracking where no "
    "bars count"
)


@dataclass(frozen=True, eq=False, slots=True)
class Loading:
    """Loads under which a span is looked at: in words, and by what each load counts.

    ``building`` tells the stage of construction, of which the moments at the axes are recorded.
    """

    words: str
    factors: Mapping[Row, float]
    building: bool = False


@dataclass(frozen=True, eq=False, slots=True)
class Hinge:
    """The worst place of a span at which it cracks without bars, under the first such loads.

    ``x`` is the distance from the left axis [mm].
    """

    span: int
    face: Face
    x: float
    loading: Loading


def hinge_of(design: Design, span: int, services: Mapping[int, ServiceMoments]) -> Hinge | None:
    """Return where a span cracks without bars under service load; None where it does not.

    ``services`` are those of all spans, each with live load where it deflects its span most.
    """
    model = design.model
    x, at = _places(design, span)
    bare = {face: _bare(design, span, face, at) for face in FACES}
    if not any(row.any() for row in bare.values()):
        return None
    solution = model.forces.solution
    moments = solution.span(span).moment(x)
    limits = cracking_moments(model, span)
    for loading in _loadings(model, span, services):
        M = np.array([loading.factors.get(row, 0.0) for row in solution.rows]) @ moments
        for face, sign in zip(FACES, (1.0, -1.0), strict=True):
            acting = np.where(bare[face], sign * M, 0.0)
            if acting.max() > limits[face] * (1 + ROUND_OFF):
                worst = np.flatnonzero(acting >= acting.max() * (1 - ROUND_OFF))[0]
                return Hinge(span, face, float(x[worst]), loading)
    return None


def _loadings(model: Model, span: int, services: Mapping[int, ServiceMoments]) -> Iterator[Loading]:
    """Give the loads of every stage, of construction first, then the span's own, then others'."""
    service = services[span]
    if model.inputs.construction_load is not None:
        kind, w_cn = model.inputs.live_kind, model.sheet.entry(f"{LOADS}/w_cn").value
        spans = range(1, model.spans + 1)
        dead = {("D", k): 1.0 for k in spans}
        added = {(kind, k): w_cn / model.uniform[kind, k].value for k in spans}
        yield Loading(BUILDING, dead | added, building=True)
    for stage, factors in service.factors.items():
        yield Loading(WORDS[stage], factors)
    for number, beside in services.items():
        for stage, factors in beside.factors.items():
            if number != span:
                yield Loading(f"{WORDS[stage]}, live load as for span {number}", factors)


def _places(design: Design, span: int) -> tuple[Floats, Floats]:
    """Return the stations of a span from its left axis, and where along the beam bars count.

    The whole span between its axes is looked at. At the axes also the bars of the faces count, by
    which the supports are designed.
    """
    left, right = design.outline.axes[span - 1 : span + 1]
    start, end = design.outline.faces(span)
    ends = sorted({left, start, end, right, *(
        x for run in design.runs for x in (run.start, run.end) if left < x < right
    )})  # fmt: skip
    between = [(a + b) / 2 for a, b in pairwise(ends)]
    even = np.round(np.linspace(0.0, right - left, STATIONS)) + left
    at = np.unique(np.clip([*ends, *between, *even, (left + right) / 2], left, right))
    x = np.concatenate([[0.0], at - left, [right - left]])
    return x, np.concatenate([[start], at, [end]])


def _bare(design: Design, span: int, face: Face, at: Floats) -> Any:
    """Tell where no bars of the web count."""
    standing = design.standing
    web = [bars for bars in standing if bars.run.place != "overhang"]
    return provide(design.designed, web, face, at, np.full(len(at), span)).A <= 0


def cracking_moments(model: Model, span: int) -> dict[Face, float]:
    """Return the moments that crack a span, bottom and top in tension [N.mm]."""
    place = span_place(model.sheet, model.inputs, span)
    names = {n: place[n].value for n in ("h", "I_g", "y_b")}
    names["b_w"] = model.sheet.find("b_w").value
    names["f_rd"] = clause.F_R_DEFLECTION.function(model.sheet.find("f_r").value)
    made = {}
    for face, formula in zip(FACES, (clause.CRACKING_BOTTOM, stages.CRACKING_WEB), strict=True):
        made[face] = value(formula, **{n: names[n] for n in formula.names})
    return made


def record_hinge(design: Design, hinge: Hinge, earlier: Mapping[str, Entry], name: str) -> None:
    """Record, in place of the limits, the check that fails for want of stiffness."""
    model, key = design.model, deflection_key(hinge.span)
    sheet = model.sheet
    with sheet.part(key, f"Deflection of {name}: no stiffness"):
        sheet.note("no-stiffness", _NOTE, title="Deflection", basis=MECHANICS)
        steps = Steps(sheet, span_place(sheet, model.inputs, hinge.span))
        steps.line(clause.F_R_DEFLECTION)
        top = hinge.face == "top"
        limit = steps.line(stages.CRACKING_WEB if top else clause.CRACKING_BOTTOM)
        x = sheet.given(
            "x_f", plain(hinge.x, "mm"), "distance from the axis of the left support",
            source=f"{hinge.face} bars: none count here; worst of all stations",
        )  # fmt: skip
        M_a = record_at(
            steps, model, hinge.loading.factors, hinge.loading.words, span=hinge.span, x=x,
            earlier=earlier,
        )  # fmt: skip
        args: dict[str, Any] = {"M_a": M_a, limit.symbol: limit}
        sheet.check(stages.WHOLE_TOP if top else stages.WHOLE, **args)


def record_beside(sheet: Sheet, span: int, name: str, hinge: int) -> None:
    """Record, in place of the limits, that a span continuous with a hinge is given none."""
    (found,) = stiffness_checks(sheet, hinge)
    with sheet.part(deflection_key(span), f"Deflection of {name}: not given"):
        text = _BESIDE.format(hinge=hinge)
        sheet.note("no-stiffness", text, title="Deflection", basis=MECHANICS)
        args: dict[str, Any] = dict(zip(found.source.names, found.args, strict=True))
        sheet.check(found.source, title=_TITLE.format(hinge=hinge), **args)


def stiffness_checks(sheet: Sheet, span: int) -> list[Entry]:
    """Return the check that a span fails for want of stiffness, if it does."""
    key = deflection_key(span)
    entries = next((part.entries for part in sheet.parts if part.key == key), {})
    return [e for e in entries.values() if e.source in stages.NO_STIFFNESS]


def continuous_with(model: Model, hinges: Sequence[int]) -> dict[int, int]:
    """Return the spans that a hinge reaches with the span it lies in: up to a fixed support."""
    made: dict[int, int] = {}
    for hinge in hinges:
        for span in (*range(hinge + 1, model.spans + 1), *range(hinge - 1, 0, -1)):
            between = range(min(span, hinge) + 1, max(span, hinge) + 1)
            if all(model.inputs.supports[j - 1].kind != "fixed" for j in between):
                made.setdefault(span, hinge)
    return {span: hinge for span, hinge in made.items() if span not in hinges}
