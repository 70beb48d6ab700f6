"""Curvature integrated along a span: deflections beside those of the effective inertia.

At every station the section is as cracked as its own moment makes it: M over E_c times the
effective moment of inertia there, with the T section in positive and the web in negative moment.
Deflections are positive downward; hogging end moments are positive. N and mm.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.deflection_service import Point
from lineproof.record import procedure

PIECES = 200
_PARTS = np.linspace(0.0, 1.0, 2 * PIECES + 1)
_CURVATURE = "curvature along the span, effective inertia at every station, Simpson"


@dataclass(frozen=True, slots=True)
class Stiffness:
    """What bends a span: moduli, gross and cracked inertia, cracking moments.

    ``I_cr1`` belongs to the left, ``I_cr2`` to the right half where the top is in tension.
    """

    E_c: float
    I_g: float
    I_gw: float
    I_crm: float
    I_cr1: float
    I_cr2: float
    M_crd: float
    M_crdn: float


@dataclass(frozen=True, eq=False, slots=True)
class Shape:
    """Deflections [mm] at stations from the left axis of the span [mm]."""

    x: Floats
    y: Floats

    @property
    def largest(self) -> float:
        """The deflection of the largest size, with its sign."""
        return float(self.y[np.abs(self.y).argmax()])


def stations(l: float) -> Floats:
    """Return the stations at which curvatures are taken: a Simpson pair a piece."""
    made: Floats = _PARTS * l
    return made


def span_moments(
    l: float, M_m: float, M_h1: float, M_h2: float, points: Sequence[Point] = ()
) -> Floats:
    """Return M at the stations: uniform load, end moments and point loads that give M_m."""
    x = stations(l)
    local = sum((p.P * np.minimum(x * (l - p.x), p.x * (l - x)) / l for p in points), 0 * x)
    at_midspan = sum(p.P * min(p.x, l - p.x) / 2 for p in points)
    uniform = M_m + (M_h1 + M_h2) / 2 - at_midspan
    moments: Floats = local + 4 * uniform * (x / l) * (1 - x / l) - M_h1 * (1 - x / l)
    return moments - M_h2 * x / l


def cantilever_moments(l: float, M_h: float, points: Sequence[Point] = ()) -> Floats:
    """Return M at the stations counted from the root; so are the point loads."""
    x = stations(l)
    uniform = M_h - sum(p.P * p.x for p in points)
    local = sum((p.P * np.maximum(p.x - x, 0.0) for p in points), 0 * x)
    moments: Floats = -uniform * (1 - x / l) ** 2 - local
    return moments


def curvatures(M: Floats, stiffness: Stiffness) -> Floats:
    """Return M/(E_c I_e) at the stations, every section cracked by its own moment."""
    s = stiffness
    left = np.arange(len(M)) <= len(M) // 2
    I_g = np.where(M >= 0, s.I_g, s.I_gw)
    I_cr = np.where(M >= 0, s.I_crm, np.where(left, s.I_cr1, s.I_cr2))
    ratio = np.where(M >= 0, s.M_crd, s.M_crdn) / np.maximum(np.abs(M), 1e-9)
    I_e = np.minimum(I_cr + (I_g - I_cr) * np.minimum(ratio, 1.0) ** 3, I_g)
    made: Floats = M / (s.E_c * I_e)
    return made


def integrated(l: float, curvature: Floats, slope: float | None = None) -> Shape:
    """Return the deflections at every other station.

    Held at both ends; with ``slope`` [rad] held at the left end alone, with that slope there.
    """
    x = stations(l)
    first = _summed(curvature, l)
    second = _summed(curvature * x, l)
    at = x[::2]
    bent = at * first - second
    start = bent[-1] / l if slope is None else slope
    return Shape(at, start * at - bent)


def _summed(values: Floats, l: float) -> Floats:
    """Return the integral from 0 to every other station, by Simpson's rule."""
    pairs = (values[:-1:2] + 4 * values[1::2] + values[2::2]) * l / (6 * PIECES)
    return np.concatenate([[0.0], np.cumsum(pairs)])


def _points(settings: dict[str, float]) -> tuple[Point, ...]:
    count = len(settings) // 2
    return tuple(Point(settings[f"P_{i}"], settings[f"x_{i}"]) for i in range(1, count + 1))


def settings_of(points: Sequence[Point]) -> dict[str, float]:
    """Return point loads as settings of a procedure: P_1 [N], x_1 [mm], ..."""
    made: dict[str, float] = {}
    for number, point in enumerate(points, start=1):
        made |= {f"P_{number}": point.P, f"x_{number}": point.x}
    return made


@procedure(
    "deflection by curvature, both ends continuous", 1, _CURVATURE,
    (
        "l", "E_c", "I_g", "I_gw", "I_crm", "I_cr1", "I_cr2", "M_crd", "M_crdn", "M_m", "M_h1",
        "M_h2",
    ),
)  # fmt: skip
def BOTH_ENDS(
    l: float, E_c: float, I_g: float, I_gw: float, I_crm: float, I_cr1: float, I_cr2: float,
    M_crd: float, M_crdn: float, M_m: float, M_h1: float, M_h2: float, **settings: float,
) -> float:  # fmt: skip
    """Return the largest deflection of a span with two continuous ends."""
    stiffness = Stiffness(E_c, I_g, I_gw, I_crm, I_cr1, I_cr2, M_crd, M_crdn)
    M = span_moments(l, M_m, M_h1, M_h2, _points(settings))
    return integrated(l, curvatures(M, stiffness)).largest


def _one_end(values: Sequence[float], settings: dict[str, float], *, left: bool) -> float:
    l, E_c, I_g, I_gw, I_crm, I_cre, M_crd, M_crdn, M_m, M_h = values
    stiffness = Stiffness(E_c, I_g, I_gw, I_crm, I_cre, I_cre, M_crd, M_crdn)
    ends = (M_h, 0.0) if left else (0.0, M_h)
    M = span_moments(l, M_m, *ends, _points(settings))
    return integrated(l, curvatures(M, stiffness)).largest


_NAMES_ONE_END = (
    "l", "E_c", "I_g", "I_gw", "I_crm", "I_cre", "M_crd", "M_crdn", "M_m", "M_h",
)  # fmt: skip


@procedure("deflection by curvature, left end continuous", 1, _CURVATURE, _NAMES_ONE_END)
def LEFT_END(*values: float, **settings: float) -> float:
    """Return the largest deflection of a span with a continuous end on the left."""
    return _one_end(values, settings, left=True)


@procedure("deflection by curvature, right end continuous", 1, _CURVATURE, _NAMES_ONE_END)
def RIGHT_END(*values: float, **settings: float) -> float:
    """Return the largest deflection of a span with a continuous end on the right."""
    return _one_end(values, settings, left=False)


@procedure(
    "deflection by curvature, simple span", 1, _CURVATURE,
    ("l", "E_c", "I_g", "I_crm", "M_crd", "M_m"),
)  # fmt: skip
def SIMPLE(
    l: float, E_c: float, I_g: float, I_crm: float, M_crd: float, M_m: float, **settings: float
) -> float:
    """Return the largest deflection of a simple span."""
    stiffness = Stiffness(E_c, I_g, I_g, I_crm, I_crm, I_crm, M_crd, M_crd)
    M = span_moments(l, M_m, 0.0, 0.0, _points(settings))
    return integrated(l, curvatures(M, stiffness)).largest
