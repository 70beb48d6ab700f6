"""Between bars along the beam and shear: which bars count where, and what stirrups resist where.

A bar counts as far as it is developed (11.3.6.4): over a stretch, with the least part that it
reaches there. Two lapped bars count as one, which changes over at the middle of the lap; where the
lap is too short, each counts as far as it is developed by itself.
"""

from __future__ import annotations

import math
from bisect import bisect_right
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from lineproof.beams.bars import centre_of
from lineproof.beams.continuous.detailing_data import Designed, ShearStretch
from lineproof.beams.continuous.faces import faces_of, has_sag, hogging
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Face
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.resistance import (
    Standing,
    area_for,
    distance_of,
    section_depth,
    shear_depth,
    stand,
)
from lineproof.beams.continuous.restraint import restraint_moment
from lineproof.beams.continuous.shear_numbers import (
    Held,
    Method,
    ShearBasis,
    SpanEnd,
    SpanNumbers,
    Stretch,
)
from lineproof.beams.continuous.shear_resistance import MOST_STRAIN
from lineproof.beams.continuous.stirrups_choice import Choice
from lineproof.beams.continuous.torsion_inputs import span_torsion

_SHORT = 1e-6
PRINTED_FORCE, PRINTED_ANGLE, PRINTED_PART = 100.0, 0.1, 0.01
"""Steps to which resistances [N], angles [deg] and parts developed are rounded down."""


def basis_of(model: Model) -> ShearBasis:
    """Return what shear rests on all along the beam."""
    find, inputs = model.sheet.find, model.inputs
    numbers = {
        n: find(n).value for n in ("b_w", "f_c", "f_y", "phi_c", "phi_s", "lambda_", "a_max", "E_s")
    }
    return ShearBasis(
        **numbers, cover=find("c_c").value, method=_method(inputs.shear_method),
        stirrup=inputs.stirrup, legs=inputs.stirrup_legs, closed=inputs.closed_stirrups,
    )  # fmt: skip


def _method(typed: str) -> Method:
    return "simplified" if typed == "simplified" else "general"


@dataclass(frozen=True, slots=True)
class Share:
    """Bars of a run as they count over a stretch: ``part`` of their area.

    ``length`` of ``rise`` [mm] is what they have to develop in, where that is not enough.
    """

    run: BarRun
    part: float
    length: float = 0.0
    rise: float = 0.0

    @property
    def area(self) -> float:
        """Area that counts [mm2]."""
        return self.run.area * self.part


@dataclass(frozen=True, slots=True)
class BarsOver:
    """The bars of a face that count over a stretch from ``start`` to ``end`` along the beam.

    ``looked_at`` are the places between which their parts are the least: those ends, but near a
    support the section from which on its bars count.
    """

    start: float
    end: float
    shares: tuple[Share, ...]
    looked_at: tuple[float, float]

    @property
    def area(self) -> float:
        """Area that counts [mm2]."""
        return sum(share.area for share in self.shares)


def bars_over(
    designed: Designed, standing: Sequence[Standing], face: Face, span: int
) -> tuple[BarsOver, ...]:
    """Return the bars of a face that count along a span, stretch by stretch."""
    left, right = designed.outline.axes[span - 1 : span + 1]
    own = [
        bars for bars in standing
        if bars.run.face == face and bars.run.start < right and bars.run.end > left
    ]  # fmt: skip
    first, last = _counted_between(designed, span)
    cuts = {left, right, (left + right) / 2, *designed.outline.faces(span), first, last}
    for bars in own:
        cuts |= {x for x in _marks(bars) if left < x < right}
    made = []
    for start, end in pairwise(sorted(cuts)):
        if end - start > _SHORT:
            a, b = (min(max(x, first), last) for x in (start, end))
            shares = (_share(bars, (a, b)) for bars in own)
            made.append(BarsOver(start, end, tuple(s for s in shares if s.part > 0), (a, b)))
    return tuple(made)


def _marks(bars: Standing) -> Iterator[float]:
    """Give the places at which the part of a run that counts begins to change, and between."""
    run = bars.run
    for end, rise, lap, inward in (
        (run.start, bars.rise_start, bars.whole_start, 1),
        (run.end, bars.rise_end, bars.whole_end, -1),
    ):
        steps = (0.5,) if lap else (0.0, 0.25, 0.5, 0.75, 1.0)
        yield from (end + inward * rise * step for step in steps)


def _share(bars: Standing, places: Sequence[float]) -> Share:
    """Return the least part that a run reaches between two places."""
    found = Share(bars.run, 1.0)
    for x in places:
        sides = (
            (x - bars.run.start, bars.rise_start, bars.whole_start),
            (bars.run.end - x, bars.rise_end, bars.whole_end),
        )
        for length, rise, lap in sides:
            part = _down(min(max(length / rise, 0.0), 1.0), PRINTED_PART)
            if lap:
                part = 1.0 if length >= rise / 2 - _SHORT else 0.0
            if part < found.part:
                found = Share(bars.run, part, length, rise)
    return found


def _stretches(
    designed: Designed, standing: Sequence[Standing], face: Face, span: int
) -> Iterator[Stretch]:
    """Give the areas of a face along a span, from its left axis, with the depths that count."""
    left, right = designed.outline.axes[span - 1 : span + 1]
    for over in bars_over(designed, standing, face, span):
        near_left = over.start + over.end <= left + right
        d = section_depth(designed, face, span, span if near_left else span + 1)
        if over.shares:  # others may stand there than at the section: a second layer, thicker ones
            d = min(d, depth_over(designed, span, over))
        yield Stretch(over.start - left, over.end - left, over.area, d)


def depth_over(designed: Designed, span: int, over: BarsOver) -> float:
    """Return the effective depth of the bars of a stretch, counted in full [mm]."""
    h, runs = designed.outline.depths[span - 1], [share.run for share in over.shares]
    return centre_of((run.area, h - distance_of(designed, run)) for run in runs)[1]


def _counted_between(designed: Designed, span: int) -> tuple[float, float]:
    """Return between which places of a span the bars count that stand there, along the beam.

    Nearer than d_v to a support that presses from below the strain may be taken as at d_v
    (11.3.6.4), so the bars count as there; also near a free end, where moment and shear are less
    than at d_v from it. Where a girder carries the beam from the side they count as at its face.
    """
    start, end = designed.outline.faces(span)
    d = section_depth(designed, "bottom", span)
    d_v = min(shear_depth(d, designed.outline.depths[span - 1]), (end - start) / 2)
    near, far = (designed.outline.supports[n].carrier != "girder" for n in (span - 1, span))
    return start + d_v * near, end - d_v * far


def span_numbers(
    model: Model, designed: Designed, runs: Iterable[BarRun]
) -> tuple[SpanNumbers, ...]:
    """Return what the shear of every span rests on."""
    kept = tuple(runs)
    standing = stand(designed, kept)
    return tuple(
        SpanNumbers(
            span,
            designed.outline.depths[span - 1],
            tuple(_stretches(designed, standing, "bottom", span)),
            tuple(_stretches(designed, standing, "top", span)),
            _end(model, designed, span, "left"),
            _end(model, designed, span, "right"),
            needed_bottom(model, designed, span),
            span_torsion(model, designed, span, kept),
        )
        for span in range(1, model.spans + 1)
    )


def _end(model: Model, designed: Designed, span: int, end: End) -> SpanEnd:
    """Return how a support holds a span; the bars at the bearing are a check of the anchorage."""
    support = span if end == "left" else span + 1
    held: Held = "direct"
    typed = model.inputs.supports[support - 1]
    if typed.kind == "free":
        held = "free"
    elif typed.carrier == "girder":
        held = "indirect"
    cap = needed_top(model, designed, support) if held == "direct" else None
    moment = restraint_moment(model, support, span) if support in designed.restrained else 0.0
    more = moment / designed.outline.lengths[span - 1]
    return SpanEnd(held, A_sr=cap, restraint=more, moment=moment)


def needed_bottom(model: Model, designed: Designed, span: int) -> float | None:
    """Return the area of bottom bars that the largest moment of a span alone asks for.

    None where no load case brings tension to the bottom.
    """
    if model.forces.beam.cantilever(span) or not has_sag(model, span):
        return None
    d = section_depth(designed, "bottom", span)
    return area_for(designed, model.forces.sag(span).M, d, designed.outline.widths[span - 1])


def needed_top(model: Model, designed: Designed, support: int) -> float | None:
    """Return the area of top bars that the larger of both moments at a support asks for."""
    areas = [
        area_for(
            designed, hogging(model, face), section_depth(designed, "top", face.span, support),
            designed.outline.b_w,
        )
        for face in faces_of(model)
        if face.support == support
    ]  # fmt: skip
    return max(areas, default=0.0) or None


def _down(value: float, step: float) -> float:
    """Return a resistance or an angle rounded down to what is printed of it."""
    return math.floor(float(value) / step * (1 + 1e-12)) * step


def weaker_of(
    first: Sequence[ShearStretch], second: Sequence[ShearStretch]
) -> tuple[ShearStretch, ...]:
    """Return the least resistances and angles of two divisions of a beam into stretches."""
    made = []
    both = (sorted(first, key=lambda s: s.start), sorted(second, key=lambda s: s.start))
    starts = [[s.start for s in each] for each in both]
    cuts = sorted({x for each in both for s in each for x in (s.start, s.end)})
    for start, end in pairwise(cuts):
        middle = (start + end) / 2
        met = [
            each[bisect_right(begin, middle) - 1]
            for each, begin in zip(both, starts, strict=True)
            if bisect_right(begin, middle)
        ]
        there = [s for s in met if s.start <= middle <= s.end]
        if there and end - start > _SHORT:
            made.append(
                ShearStretch(
                    start, end, min(s.V_r for s in there), min(s.V_s for s in there),
                    min(s.theta for s in there),
                )
            )  # fmt: skip
    return tuple(made)


def stretches_of(choice: Choice, outline: BeamOutline) -> tuple[ShearStretch, ...]:
    """Return the resistance of the stirrups along the beam: the weakest of all cases at a place."""
    made = []
    for check in choice.checks:
        left = outline.axes[check.state.numbers.span - 1]
        columns = check.state.columns + left
        V_s, v = np.asarray(check.bars["V_s"]), check.state.v
        V_c = np.where(check.plain, v["V_plain"], v["V_c"])
        in_range = v["eps_asked"] <= MOST_STRAIN * (1 + 1e-12)  # beyond it, or without bars, none
        V_r = np.where(in_range, np.minimum(V_c + V_s, v["V_rmax"]), 0.0)
        # Of both ends of each stretch the weaker: (cases, stretches).
        both = {"V_r": V_r, "V_s": V_s, "theta": v["theta"]}
        weaker = {name: np.minimum(each[:, :-1], each[:, 1:]) for name, each in both.items()}
        rows = {name: each.argmin(axis=0).tolist() for name, each in weaker.items()}
        least = {name: each.min(axis=0).tolist() for name, each in weaker.items()}
        for i, (start, end) in enumerate(pairwise(columns.tolist())):
            if end - start > _SHORT:
                made.append(
                    ShearStretch(
                        start, end, _down(least["V_r"][i], PRINTED_FORCE),
                        _down(least["V_s"][i], PRINTED_FORCE),
                        _down(least["theta"][i], PRINTED_ANGLE),
                        {name: str(check.state.cases[each[i]]) for name, each in rows.items()},
                    )
                )  # fmt: skip
    return tuple(made)
