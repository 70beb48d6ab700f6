"""Where bars may end: points of no further need, extensions, ends in a tension zone.

``t`` is a distance from the axis of the near support: the one that bottom bars run towards, and
that top bars run away from.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass
from typing import Literal, TypeVar

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.anchorage import development_length, holds, value
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.resistance import (
    Standing,
    area_for,
    distance_of,
    moment_of,
    provide,
    section_depth,
    shear_depth,
    yield_force,
)
from lineproof.beams.continuous.resistance_cover import ratios
from lineproof.beams.continuous.resistance_demand import (
    NOTHING,
    SpanDemand,
    Whole,
    demand_of,
    stretch_at,
    stretches_at,
)
from lineproof.formula import Formula
from lineproof.standards.a23_3 import cutoff as clause

STEP = 50.0
"""Ends of bars stand on this module [mm] from the axis of a support, to the safe side."""
DESIGN_STATIONS = 101
MARGIN = 0.998
"""Ratio kept at design, so that stations between those looked at are covered too."""
Distance = TypeVar("Distance", float, np.ndarray)
Zone = Literal["compression", "support", "low shear", "double area", ""]
"""By which rule of 12.10.5 bars may end at a place; "" for none.

Between the faces of a support no section in shear stands, whose strength an end could lessen.
"""


@dataclass(frozen=True, eq=False, slots=True)
class Frame:
    """A beam while its bars are laid, with its demand at the design stations of every span."""

    designed: Designed
    demands: tuple[SpanDemand, ...]

    @classmethod
    def of(cls, designed: Designed, count: int = DESIGN_STATIONS) -> Frame:
        """Return the frame of a beam."""
        spans = range(1, len(designed.outline.lengths) + 1)
        return cls(designed, tuple(demand_of(designed, span, count) for span in spans))


@dataclass(frozen=True, slots=True)
class Point:
    """A point of no further need: distance from the near axis and the case that governs there."""

    t: float
    row: int


def floor50(t: float) -> float:
    """Return a distance down to the module."""
    return math.floor(t / STEP + 1e-9) * STEP


def ceil50(t: float) -> float:
    """Return a distance up to the module."""
    return math.ceil(t / STEP - 1e-9) * STEP


def least_step(count: int, enough: Callable[[int], bool]) -> int | None:
    """Return the least of ``count`` steps that is enough, by halving; None where none is.

    A step further is never worse.
    """
    if count <= 0:
        return None
    if enough(0):
        return 0
    low, high = 0, count - 1
    if high == 0 or not enough(high):
        return None
    while high - low > 1:
        middle = (low + high) // 2
        low, high = (low, middle) if enough(middle) else (middle, high)
    return high


def axis_of(designed: Designed, span: int, near: End) -> float:
    """Return where the axis of the near support stands along the beam."""
    return designed.outline.axes[span - 1 if near == "left" else span]


def along(designed: Designed, span: int, near: End, t: float) -> float:
    """Return the place along the beam at the distance t from the near axis, into the span."""
    axis = axis_of(designed, span, near)
    return axis + t if near == "left" else axis - t


def distance(designed: Designed, span: int, near: End, x: float) -> float:
    """Return the distance from the near axis of a place along the beam."""
    axis = axis_of(designed, span, near)
    return x - axis if near == "left" else axis - x


def local(designed: Designed, span: int, near: End, t: Distance) -> Distance:
    """Return the station from the left axis of the span at the distance t from the near axis.

    The same turns a station into a distance; both in mm.
    """
    return t if near == "left" else designed.outline.lengths[span - 1] - t


def half_of(designed: Designed, span: int, near: End) -> float:
    """Return the distance of the near face from the near axis."""
    return designed.outline.supports[span - 1 if near == "left" else span].half


def support_of(span: int, near: End) -> int:
    """Return the number of the near support."""
    return span if near == "left" else span + 1


def full_moment(designed: Designed, face: Face, span: int, runs: Iterable[BarRun]) -> float:
    """Return the moment resistance of fully developed bars in a span."""
    A, lever = full_area(designed, runs)
    if A == 0:
        return 0.0
    d = designed.outline.depths[span - 1] - lever
    b = designed.outline.widths[span - 1] if face == "bottom" else designed.outline.b_w
    return float(moment_of(designed, np.array([A]), np.array([d]), np.array([b]))[0])


def full_area(designed: Designed, runs: Iterable[BarRun]) -> tuple[float, float]:
    """Return area of the bars and distance of their centroid from their face."""
    kept = tuple(runs)
    A = sum(run.area for run in kept)
    moment = sum(run.area * distance_of(designed, run) for run in kept)
    return A, (moment / A if A else 0.0)


def moments(designed: Designed, face: Face, span: int, near: End, t: np.ndarray) -> np.ndarray:
    """Return the moments of all cases (cases, t) of a face, positive where it is in tension."""
    M = designed.forces.moments(span, local(designed, span, near, t))
    return M if face == "bottom" else -M


def no_further_need(frame: Frame, face: Face, span: int, near: End, M_r: float) -> Point | None:
    """Return from where on the continuing bars of resistance M_r do alone, on whole mm.

    Bottom bars: towards the near support; top bars: away from it. None where they do alone
    everywhere (bottom), or nowhere up to the far support (top). At an end whose restraint is
    assumed the analysis has no moment: tension in the top is that of the other support.
    """
    designed = frame.designed
    demand = frame.demands[span - 1]
    t = local(designed, span, near, demand.local)
    M = demand.side(face).M
    order = np.argsort(t)
    t, M = t[order], M[order]
    needed = np.flatnonzero(max(M_r, NOTHING) < M)
    if face == "bottom":
        if not len(needed):
            return None
        first = int(needed[0])
        return _between(designed, face, span, near, M_r, t[max(first - 1, 0)], t[first])
    half = half_of(designed, span, near)
    last = _last_needed(needed, int(np.searchsorted(t, reach(designed, span), side="right")))
    if last is None or support_of(span, near) in designed.restrained:
        return _between(designed, face, span, near, M_r, half, half)
    if last + 1 >= len(t):
        return None
    return _between(designed, face, span, near, M_r, t[last], t[last + 1])


def _last_needed(needed: Whole, half: int) -> int | None:
    """Return the last station that needs the bars of this support, without a break from it on.

    None where the first station that needs them lies in the other half of the span: it is for
    the bars of the other support.
    """
    if not len(needed) or needed[0] >= half:
        return None
    breaks = np.flatnonzero(np.diff(needed) > 1)
    return int(needed[breaks[0]] if len(breaks) else needed[-1])


def first_need(frame: Frame, span: int, near: End, M_r: float) -> Point | None:
    """Return up to where from a support on bars of resistance M_r do alone at the top, on whole mm.

    None where they do not even at the near face, and where they do all along.
    """
    designed = frame.designed
    demand = frame.demands[span - 1]
    t = local(designed, span, near, demand.local)
    order = np.argsort(t)
    t, M = t[order], demand.side("top").M[order]
    needed = np.flatnonzero(max(M_r, NOTHING) < M)
    if not len(needed) or needed[0] == 0:
        return None
    first = int(needed[0])
    start = t[first - 1]
    there = np.clip(np.arange(math.floor(start), math.ceil(t[first]) + 1.0), start, t[first])
    cases = moments(designed, "top", span, near, there)
    index = max(int(np.argmax(cases.max(axis=0) > max(M_r, NOTHING))) - 1, 0)
    return Point(float(there[index]), int(cases[:, index].argmax()))


def far_face(designed: Designed, span: int, near: End) -> float:
    """Return the distance of the far face from the near axis."""
    far = designed.outline.supports[span if near == "left" else span - 1].half
    return designed.outline.lengths[span - 1] - far


def sag_at(designed: Designed, span: int) -> float:
    """Return where the largest moment of a span stands along the beam."""
    return designed.outline.axes[span - 1] + designed.sags[span - 1].x


def reach(designed: Designed, span: int) -> float:
    """Return how far from its support a top bar belongs to it: half the span, or all of it."""
    length = designed.outline.lengths[span - 1]
    return length if designed.cantilever(span) else length / 2


def _between(
    designed: Designed, face: Face, span: int, near: End, M_r: float, a: float, b: float
) -> Point:
    """Return the last whole mm between a and b at which M_r still does, from the safe side."""
    t = np.arange(math.floor(a), math.ceil(b) + 1, dtype=float)
    t = np.clip(t, 0.0, designed.outline.lengths[span - 1])
    M = moments(designed, face, span, near, t)
    needed = M.max(axis=0) > max(M_r, NOTHING)
    if face == "bottom":
        index = max(int(np.argmax(needed)) - 1, 0) if needed.any() else len(t) - 1
    else:
        index = min(len(t) - int(np.argmax(needed[::-1])), len(t) - 1) if needed.any() else 0
    return Point(float(t[index]), int(M[:, index].argmax()))


def extension_formula(designed: Designed, span: int) -> Formula:
    """Return what bars extend past a point of no further need in a span (12.10.3).

    The shift for shear stands for the force that it adds only where no torsion counts (11.3.9.2);
    where it does, that force is checked along the bars (11.3.10.6).
    """
    return clause.EXTENSION_PLAIN if span in designed.torsion else clause.EXTENSION


def extension(
    designed: Designed, face: Face, span: int, near: End, t: float, size_d: float
) -> float:
    """Return the extension past a point of no further need; ``size_d`` is the bar diameter."""
    d, d_v = depths(designed, face, span, near)
    theta = stretch_at(designed, along(designed, span, near, t)).theta
    return value(extension_formula(designed, span), d=d, d_b=size_d, d_v=d_v, theta=theta)


def depths(designed: Designed, face: Face, span: int, near: End) -> tuple[float, float]:
    """Return effective depth and effective shear depth of the section that the bars belong to."""
    d = section_depth(designed, face, span, support_of(span, near))
    return d, shear_depth(d, designed.outline.depths[span - 1])


def continuing_length(
    designed: Designed, face: Face, span: int, near: End, runs: Iterable[BarRun]
) -> float:
    """Return the length of continuing bars past a point of no further need (12.10.4)."""
    d, _ = depths(designed, face, span, near)
    return max(
        (
            value(
                clause.CONTINUING, d=d, d_b=run.diameter,
                l_d=development_length(designed, run),
            )
            for run in runs
        ),
        default=0.0,
    )  # fmt: skip


def zone_at(
    designed: Designed,
    face: Face,
    span: int,
    near: End,
    t: float,
    continuing: Sequence[BarRun],
    ending: Sequence[BarRun] = (),
) -> Zone:
    """Return by which rule of 12.10.5 bars may end at t, "" where they may not.

    ``ending`` are the bars that end, where they may be thicker than 35M: of these none end by the
    double area of the others.
    """
    zone = zones_at(designed, face, span, near, [t], continuing)[0]
    return "" if zone == "double area" and not thin(ending) else zone


def thin(runs: Iterable[BarRun]) -> bool:
    """Tell whether bars are thin enough to end by the double area of others (12.10.5)."""
    return all(holds(clause.CUT_OF_THIN_BARS, d_b=run.diameter) for run in runs)


def zones_at(
    designed: Designed,
    face: Face,
    span: int,
    near: End,
    places: Sequence[float],
    continuing: Sequence[BarRun],
) -> list[Zone]:
    """Return by which rule of 12.10.5 bars may end at each of the distances."""
    x = np.array([local(designed, span, near, t) for t in places])
    M, V = designed.forces.along(span, x)
    M_face = M if face == "bottom" else -M
    M_f, V_f = M_face.max(axis=0), shear_in_tension(M_face, V).max(axis=0)
    met = stretches_at(designed, np.array([along(designed, span, near, t) for t in places]))
    made: list[Zone] = [
        _zone(designed, face, span, (moment, shear, stretch.V_r), continuing)
        for stretch, moment, shear in zip(met, M_f.tolist(), V_f.tolist(), strict=True)
    ]
    half, far = half_of(designed, span, near), far_face(designed, span, near)
    return [
        "support" if zone != "compression" and not half < t < far else zone
        for t, zone in zip(places, made, strict=True)
    ]


def shear_in_tension(M_face: Floats, V: Floats) -> Floats:
    """Return the size of the shear of the cases that put a face in tension, zero of the others.

    Bars end in a tension zone only in the cases that pull them. ``M_face`` [N.mm] is positive where
    the face is in tension, of the shape of ``V`` [N].
    """
    made: Floats = np.where(M_face > NOTHING, np.abs(V), 0.0)
    return made


def _zone(
    designed: Designed,
    face: Face,
    span: int,
    forces: tuple[float, float, float],
    continuing: Sequence[BarRun],
) -> Zone:
    M_f, V_f, V_r = forces
    if M_f <= NOTHING:
        return "compression"
    if holds(clause.CUT_AT_LOW_SHEAR, V_f=V_f, V_r=V_r):
        return "low shear"
    if not holds(clause.CUT_AT_MODERATE_SHEAR, V_f=V_f, V_r=V_r):
        return ""
    A_co, lever = full_area(designed, continuing)
    d = designed.outline.depths[span - 1] - lever
    b = designed.outline.widths[span - 1] if face == "bottom" else designed.outline.b_w
    double = holds(clause.CUT_AT_DOUBLE_AREA, A_sr=area_for(designed, M_f, d, b), A_co=A_co)
    return "double area" if double else ""


def worst_between(
    frame: Frame, bars: Sequence[Standing], face: Face, span: int, bounds: tuple[float, float]
) -> float:
    """Return the worst ratio of a face between two places along the beam, at design stations.

    The places where the developed area changes its slope are looked at as well.
    """
    designed, demand = frame.designed, frame.demands[span - 1]
    standing = [s for s in bars if s.run.face == face]
    kinks = [
        x
        for s in standing
        for x in (s.run.start, s.run.start + s.rise_start, s.run.end - s.rise_end, s.run.end)
    ]
    kinks += demand.side(face).crossings(demand.x)
    low, high = max(bounds[0], float(demand.x[0])), min(bounds[1], float(demand.x[-1]))
    inside = [x for x in (low, high, *kinks) if low <= x <= high]
    kept = demand.x[(demand.x >= low) & (demand.x <= high)]
    x = np.concatenate([kept, np.array(inside)])
    side = demand.side(face).between(demand.x, x)
    provided = provide(designed, standing, face, x, np.full(len(x), span))
    return float(ratios(side, provided, yield_force(designed), side.force).max())
