"""Shear of one span, every load case at every station with its own pair of moment and shear.

Columns: the section at the left support that 11.3.2 lets a case use, the stations from face to
face, the section at the right support. Nearer to a support than that section, its values hold.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from typing import Any

import numpy as np

from lineproof.beams.analysis.arrangements import LoadCase
from lineproof.beams.analysis.curves import Floats, Side
from lineproof.beams.analysis.imported import TOLERANCE
from lineproof.beams.analysis.model import PartialLoad, PointLoad
from lineproof.beams.continuous.forces import End, Forces
from lineproof.beams.continuous.imported_forces import ImportedForces
from lineproof.beams.continuous.shear_arrays import Truths, holds, value
from lineproof.beams.continuous.shear_numbers import (
    ShearBasis,
    SpanNumbers,
    Stretch,
    area_at,
    check_span,
    depth_at,
)
from lineproof.beams.continuous.shear_resistance import MOST_STRAIN, resistances
from lineproof.beams.continuous.shear_restrained import restrained
from lineproof.beams.continuous.torsion import torque_per_length
from lineproof.standards.a23_3 import shear, torsion

STEP = 50.0
"""Distance of the stations at which a span is checked [mm], besides loads and ends."""
MOST_PER_CORNER_BAR = 16.0
"""Largest spacing of closed stirrups over the diameter of their corner bars (11.2.7)."""
_DEEP_FOR_PLAIN = 750.0


@dataclass(frozen=True, eq=False, slots=True)
class Critical:
    """The section at one end at which each case is designed (cases,): 11.3.2.

    ``x`` is measured from the left axis; ``reason`` is why a case is taken at the face ("" at
    d_v); ``V_pl`` the shear by point loads between the face and d_v; ``mixed`` where the moment
    changes its sign between the face and the section, so that the smaller depth is used.
    """

    x: Floats
    M: Floats
    V: Floats
    d: Floats
    V_pl: Floats
    reason: tuple[str, ...]
    mixed: Truths


@dataclass(frozen=True, eq=False)
class SpanState:
    """Pairs and resistances of a span, arrays (cases, columns).

    ``needed`` is what strength asks of the stirrups, 1/s [1/mm]; ``V_plain`` the resistance of the
    concrete without stirrups or below the minimum; ``counts`` where torsion counts. ``sides``
    tells on which side of a load a column stands; ``nearer`` the columns nearer to a support than
    its critical section. ``held`` is what :func:`restrained` gives.
    """

    basis: ShearBasis
    numbers: SpanNumbers
    cases: tuple[LoadCase, ...]
    faces: tuple[float, float]
    stations: Floats
    sides: tuple[Side, ...]
    left: Critical
    right: Critical
    v: dict[str, Any]
    nearer: Truths
    held: dict[int, dict[str, Any]]

    @property
    def h(self) -> float:
        """Depth of the span."""
        return self.numbers.h

    @cached_property
    def columns(self) -> Floats:
        """Stations of the columns; the critical sections stand at the faces."""
        return np.concatenate([[self.faces[0]], self.stations, [self.faces[1]]])

    @cached_property
    def required(self) -> Floats:
        """The 1/s that strength asks for at each column, restraint of the ends included."""
        made: Floats = self.v["asked"].max(axis=0)
        return made

    @cached_property
    def largest_spacing(self) -> Floats:
        """The largest spacing allowed at each column by 11.3.8 and by the minimum of 11.2.8.2."""
        made: Floats = np.minimum(self.allowed.min(axis=0), self.minimum_spacing)
        return made

    @cached_property
    def allowed(self) -> Floats:
        """The largest spacing of every case by 11.3.8, and for the corner bars by 11.2.7."""
        made: Floats = self.v["s_max"]
        if self.numbers.torsion is not None:
            corner = MOST_PER_CORNER_BAR * self.numbers.torsion.d_b
            made = np.where(self.v["counts"], np.minimum(made, corner), made)
        return made

    @cached_property
    def minimum_spacing(self) -> float:
        """Spacing at which the stirrups are just the minimum."""
        return float(value(shear.SPACING_MINIMUM, _materials(self.basis)))

    @cached_property
    def hopeless(self) -> Floats:
        """Utilisation of what no stirrups cure: web, section with torsion, strain; by case."""
        made: Floats = np.maximum(self.crushing, self.v["eps_asked"] / MOST_STRAIN)
        return made

    @cached_property
    def crushing(self) -> Floats:
        """Utilisation of what neither stirrups nor bars cure: web, section with torsion."""
        made: Floats = np.maximum(self.v["V_f"] / self.v["V_rmax"], self.v["section"])
        return made

    def utilisation(self, effective: Floats, plain: Truths) -> Floats:
        """Return demand over resistance of every case and column for 1/s at the columns [1/mm].

        Columns that are ``plain`` have no stirrups that count; infinite where they must stand.
        """
        made = np.maximum(self.resisted(effective, plain), self.hopeless)
        return np.where(self.forbidden(plain), np.inf, made)

    def forbidden(self, plain: Truths) -> Truths:
        """Tell where stirrups must stand, for depth or torsion, and none count."""
        made: Truths = plain & (self.v["counts"] | (self.h > _DEEP_FOR_PLAIN))
        return made

    def resisted(self, effective: Floats, plain: Truths) -> Floats:
        """Return shear, with torsion where it counts, over what resists it, as ``utilisation``.

        Neither the range of the strain nor whether stirrups must stand is looked at.
        """
        v = self.v
        V_s = v["cot"] * effective
        with np.errstate(divide="ignore", invalid="ignore"):
            by_shear = v["V_f"] / np.minimum(v["V_c"] + V_s, v["V_rmax"])
            by_both = np.where(v["counts"], v["needed"] / effective, by_shear)
            alone = v["V_f"] / v["V_plain"]
        made: Floats = np.where(plain, alone, by_both)
        return made


def _materials(basis: ShearBasis) -> dict[str, Any]:
    names = ("b_w", "f_c", "f_y", "phi_c", "phi_s", "lambda_", "a_max", "E_s", "A_v", "d_bs")
    return {name: getattr(basis, name) for name in names}


def span_state(
    basis: ShearBasis, numbers: SpanNumbers, forces: Forces, extra: tuple[float, ...] = ()
) -> SpanState:
    """Work out a span; ``extra`` are further stations from its left axis."""
    span = numbers.span
    faces = forces.beam.faces(span)
    check_span(numbers, faces[1] - faces[0])
    ends = [_End.of(numbers, "left", faces[0]), _End.of(numbers, "right", faces[1])]
    x, sides, M, V = _along(forces, span, faces, (extra, ends))
    left, right = (_critical(basis, end, forces, M, V, 3 * n) for n, end in enumerate(ends))
    x, sides, M, V = x[6:], sides[6:], M[:, 6:], V[:, 6:]
    at = _columns(left.x, x, right.x)
    M = np.hstack([left.M[:, None], M, right.M[:, None]])
    V = np.hstack([left.V[:, None], V, right.V[:, None]])
    bottom = M >= 0
    d = np.where(bottom, *(_columns(left.d, depth_at(bars, x), right.d) for bars in numbers.faces))
    areas = [
        _columns(area_at(bars, left.x), area_at(bars, x), area_at(bars, right.x))
        for bars in numbers.faces
    ]
    v = _materials(basis) | {
        "h": numbers.h, "x": at, "M": M, "V": V, "M_f": np.abs(M), "V_f": np.abs(V),
        "bottom": bottom, "d": d, "A_s": np.where(bottom, *areas),
        "A_sp": np.where(bottom, *areas[::-1]),
    }  # fmt: skip
    v["T_all"] = _torsion_along(numbers, forces, faces, at)
    v |= resistances(basis, numbers, v)
    more = np.where(at < sum(faces) / 2, numbers.left.restraint, numbers.right.restraint)
    legs = value(torsion.LEGS_FOR_SHEAR, v | {"V_f": v["V_f"] + more})
    v["asked"] = (legs + 2 * v["a_t"]) / basis.A_v
    held = restrained(basis, numbers, v)
    for column, w in held.items():
        v["asked"][:, column] = np.maximum(v["asked"][:, column], w["needed"][:, 0])
    room = 1e-6
    before, after = at <= left.x[:, None] + room, at >= right.x[:, None] - room
    before[:, 0] = after[:, 0] = before[:, -1] = after[:, -1] = False
    for name in ("needed", "asked", "s_max", "section", "eps_asked", "V_rmax", "V_c", "V_plain",
                 "V_f", "cot", "counts"):  # fmt: skip
        v[name] = np.where(before, v[name][:, :1], np.where(after, v[name][:, -1:], v[name]))
    sides = ("left", *sides, "right")
    cases = forces.cases
    return SpanState(basis, numbers, cases, faces, x, sides, left, right, v, before | after, held)


def _columns(left: Floats, stations: Floats, right: Floats) -> Floats:
    """Return an array (cases, columns) from both critical sections and the stations."""
    made = np.empty((len(left), len(stations) + 2))
    made[:, 0], made[:, 1:-1], made[:, -1] = left, stations, right
    return made


@dataclass(frozen=True, slots=True)
class _End:
    """One end of a span: depths to the bottom and top bars there, and d_v for each."""

    numbers: SpanNumbers
    end: End
    face: float
    depths: tuple[float, float]
    d_v: tuple[float, float]

    @classmethod
    def of(cls, numbers: SpanNumbers, end: End, face: float) -> _End:
        depths = _depth(numbers.bottom, face), _depth(numbers.top, face)
        d_v = shear.D_V.function(depths[0], numbers.h), shear.D_V.function(depths[1], numbers.h)
        return cls(numbers, end, face, depths, d_v)

    @property
    def stations(self) -> list[float]:
        """The face, d_v of the bottom bars from it, d_v of the top bars from it."""
        inward = 1.0 if self.end == "left" else -1.0
        return [self.face, *(self.face + inward * each for each in self.d_v)]


def _depth(bars: tuple[Stretch, ...], x: float) -> float:
    """Return the depth to the bars of a face at one station; outside them that of the nearest."""
    return min(bars, key=lambda s: max(s.start - x, x - s.end)).d


def _along(
    forces: Forces,
    span: int,
    faces: tuple[float, float],
    more: tuple[tuple[float, ...], list[_End]],
) -> tuple[Floats, tuple[Side, ...], Floats, Floats]:
    """Return stations with M and V: first those of the two ends, then from face to face.

    Those of the ends stand on the outer side of a load there; a load on the span stands between
    two stations.
    """
    extra, ends = more
    curves = forces.solved.solution.span(span)
    steps = _steps(*faces)
    inner = [b for b in curves.breaks.tolist() if faces[0] < b < faces[1]]
    # A critical section is a station as well: stirrups may change between it and the one before.
    critical = {x for end in ends for x in end.stations[1:] if faces[0] < x < faces[1]}
    right = [*ends[1].stations, *sorted({*steps, *inner, *extra, *critical})]
    left = [*ends[0].stations, *inner, faces[1]]
    pairs = forces.along(span, np.array(left), "left"), forces.along(span, np.array(right), "right")
    x = np.array([*left, *right])
    order = [0, 1, 2, len(left), len(left) + 1, len(left) + 2]
    rest = np.array([*range(3, len(left)), *range(len(left) + 3, len(x))])
    order += rest[np.argsort(x[rest], kind="stable")].tolist()
    M, V = (np.hstack([pair[k] for pair in pairs])[:, order] for k in (0, 1))
    sides: tuple[Side, ...] = tuple("left" if n < len(left) else "right" for n in order)
    return x[order], sides, M, V


def _steps(start: float, end: float) -> list[float]:
    """Return stations from both faces to midspan, so that a symmetrical span has like ones."""
    half = np.arange(0.0, (end - start) / 2, STEP)
    return [*(start + half).tolist(), *(end - half).tolist()]


def _torsion_along(
    numbers: SpanNumbers, forces: Forces, faces: tuple[float, float], at: Floats
) -> Floats:
    """Return the size of the torsion of every case and column, before redistribution."""
    if numbers.torsion is None:
        return np.zeros_like(at)
    if isinstance(forces, ImportedForces):
        return np.abs(forces.imported_torsion(numbers.span, at))
    torque = torque_per_length(numbers.torsion, forces, numbers.span)
    still = (faces[0] + faces[1]) / 2
    if numbers.left.held == "free":
        still = faces[0]
    elif numbers.right.held == "free":
        still = faces[1]
    made: Floats = np.abs(torque[:, None] * (still - at))
    return made


def _critical(
    basis: ShearBasis, end: _End, forces: Forces, M: Floats, V: Floats, first: int
) -> Critical:
    """Return the section at an end for every case: at d_v where 11.3.2 lets it, else at the face.

    The pairs of its three stations stand in the columns from ``first`` on. A case uses the depth
    of the face in tension. Where its moment changes sign between the face and the section, it uses
    the smaller depth of the two.
    """
    M, V = M[:, first : first + 3], V[:, first : first + 3]
    sagging = M >= 0
    bottom: Truths = np.all(sagging, axis=1)
    top: Truths = ~np.any(sagging, axis=1)
    smaller = int(end.d_v[1] < end.d_v[0])
    which = np.where(bottom, 0, np.where(top, 1, smaller))
    rows = np.arange(len(M))
    loads = [near_point_loads(forces, end.numbers.span, end.end, end.face, d) for d in end.d_v]
    V_pl = np.array(loads)[which, rows]
    d_v = np.array(end.d_v)[which]
    small = holds(shear.NEAR_POINT_LOADS, _materials(basis) | {"V_pl": V_pl, "d_v": d_v})
    pushed = V[:, 0] > 0 if end.end == "left" else V[:, 0] < 0
    support = end.numbers.left if end.end == "left" else end.numbers.right
    turned = _point_torques(forces, end)
    reason = tuple(
        _reason(support.held, pushed=up, small=few, turned=torque)
        for up, few, torque in zip(pushed.tolist(), small.tolist(), turned.tolist(), strict=True)
    )
    column = np.where([not each for each in reason], which + 1, 0)
    d = np.array([*end.depths, min(end.depths)])[np.where(bottom, 0, np.where(top, 1, 2))]
    x = np.array(end.stations)[column]
    return Critical(x, M[rows, column], V[rows, column], d, V_pl, reason, ~(bottom | top))


def _point_torques(forces: Forces, end: _End) -> Truths:
    """Tell in which cases an imported point torque acts between the face and d_v from it.

    Sections nearer to the support then have a larger torsion than the one at d_v. What files leave
    by rounding is none.
    """
    if not isinstance(forces, ImportedForces):
        return np.zeros(len(forces.cases), dtype=bool)
    span, reach = end.numbers.span, max(end.d_v)
    low, high = (end.face, end.face + reach) if end.end == "left" else (end.face - reach, end.face)
    largest = np.abs(forces.imported_torsion(span, forces.solved.solution.span(span).breaks))
    made: Truths = forces.point_torque(span, low, high) > TOLERANCE * largest.max(axis=1)
    return made


def _reason(held: str, *, pushed: bool, small: bool, turned: bool) -> str:
    if held != "direct":
        return held
    if not pushed:
        return "uplift"
    if turned:
        return "point torque"
    return "" if small else "point load"


def near_point_loads(forces: Forces, span: int, end: End, face: float, d_v: float) -> Floats:
    """Return the point loads between the face and d_v of every case [N], each counted whole.

    A load on part of the span that is not longer than d_v counts as a point load.
    """
    rows = forces.solution.rows
    near = loads_near(forces, span, end, face, d_v)
    if not near:
        return np.zeros(len(forces.cases))
    sums = np.zeros(len(rows))
    for load, size in near:
        sums[rows.index((load.kind, span))] += size
    made: Floats = forces.factors @ sums
    return np.abs(made)


def loads_near(
    forces: Forces, span: int, end: End, face: float, d_v: float
) -> list[tuple[PointLoad | PartialLoad, float]]:
    """Return the loads on a span that count as point loads within d_v of a face, with sizes."""
    low, high = (face, face + d_v) if end == "left" else (face - d_v, face)
    found: list[tuple[PointLoad | PartialLoad, float]] = []
    for load in forces.loads:
        if load.span != span:
            continue
        if isinstance(load, PointLoad) and low <= load.at <= high:
            found.append((load, load.P))
        elif isinstance(load, PartialLoad) and load.end - load.start <= d_v:
            part = min(load.end, high) - max(load.start, low)
            if part > 0:
                found.append((load, load.w * part))
    return found
