"""Whether the bars as detailed carry every load case at every station; where they do not."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace

import numpy as np

from lineproof.beams.analysis.arrangements import LoadCase
from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.resistance import Provided, Standing, provide, stand, yield_force
from lineproof.beams.continuous.resistance_demand import (
    Side,
    SpanDemand,
    demand_at,
    demand_of,
)
from lineproof.beams.continuous.resistance_ratio import ratio_of, ratios_of
from lineproof.beams.continuous.resistance_torsion import TurnedStation, worst_turned

FACES: tuple[Face, Face] = ("bottom", "top")
COUNT = 1000
ROUND_OFF = 1e-9


@dataclass(frozen=True, slots=True)
class Station:
    """One station of one face: moment and tension against what the developed bars carry.

    ``x`` along the beam, ``local`` from the left axis of the span; N, mm. ``row`` and ``case``
    are those of the larger of the two ratios. ``column`` is that of the section of shear whose
    tension with torsion F is, None where F is without.
    """

    face: Face
    span: int
    x: float
    local: float
    M_f: float
    M_r: float
    F: float
    F_r: float
    row: int
    case: LoadCase
    column: int | None = None

    @property
    def ratio(self) -> float:
        """The larger of both ratios; infinite where bars are needed and none counts."""
        return max(ratio_of(self.M_f, self.M_r), ratio_of(self.F, self.F_r))

    @property
    def by_tension(self) -> bool:
        """Whether the tension with shear governs, not the moment alone."""
        return ratio_of(self.F, self.F_r) > ratio_of(self.M_f, self.M_r)


@dataclass(frozen=True, slots=True)
class Gap:
    """A stretch along the beam in which the bars of a face do not carry what they must.

    ``at`` is its worst station.
    """

    face: Face
    span: int
    start: float
    end: float
    at: Station

    @property
    def worst(self) -> float:
        """The largest ratio in it; infinite where no bars count."""
        return self.at.ratio

    def holds(self, station: Station) -> bool:
        """Tell whether a station lies in it."""
        same = (station.face, station.span) == (self.face, self.span)
        return same and self.start <= station.x <= self.end

    def covers(self, other: Gap) -> bool:
        """Tell whether another gap lies in it."""
        same = (other.face, other.span) == (self.face, self.span)
        return same and self.start <= other.start and other.end <= self.end

    @property
    def bare(self) -> bool:
        """Whether no bars count at its worst station."""
        return self.worst == np.inf

    @property
    def title(self) -> str:
        """Where it is, from the left axis of its span, as a check of it is called."""
        what = f"Gap in the {self.face} bars" if self.bare else f"Not enough {self.face} bars"
        return f"{what}, span {self.span}, {' to '.join(self.ends)} m from its left axis"

    @property
    def ends(self) -> tuple[str, str]:
        """Where it begins and ends, from the left axis of its span, as printed [m]."""
        left = self.at.x - self.at.local
        return f"{(self.start - left) / 1e3:.2f}", f"{(self.end - left) / 1e3:.2f}"

    def __str__(self) -> str:
        """Say where it is, and what acts and holds at its worst station."""
        at, what, unit, size = self.at, "moment", "kN·m", 1e6
        now, held = at.M_f, at.M_r
        if at.by_tension:
            what, unit, size, now, held = "tension", "kN", 1e3, at.F, at.F_r
        ratio = "no bars count there" if self.bare else f"ratio {self.worst:.2f}"
        return (
            f"{self.title}; worst at {at.local / 1e3:.2f} m: a {what} of {now / size:.0f} {unit} "
            f"against {held / size:.0f} {unit}, {ratio}"
        )


@dataclass(frozen=True, slots=True)
class Coverage:
    """The worst station of every face and span, and the gaps.

    ``by_moment`` and ``by_tension`` are those of the moment alone and of the tension with shear,
    the latter between the faces of the supports, and with torsion where it counts. A gap is of
    moment or shear; too few bars for torsion fail the check of their section.
    """

    worst: Station
    stations: tuple[Station, ...]
    by_moment: tuple[Station, ...]
    by_tension: tuple[Station, ...]
    gaps: tuple[Gap, ...]

    @property
    def holds(self) -> bool:
        """Whether no station is uncovered."""
        return not self.gaps


def ratios(side: Side, provided: Provided, force: float, turned: Floats | None = None) -> Floats:
    """Return demand over resistance at every station; ``force`` is that of 1 mm2 at yield.

    ``turned`` is the tension with torsion, if it is to count as well.
    """
    F_f = side.F if turned is None else np.maximum(side.F, turned)
    made: Floats = np.maximum(ratios_of(side.M, provided.M_r), ratios_of(F_f, provided.A * force))
    return made


def covered(designed: Designed, runs: Iterable[BarRun], count: int = COUNT) -> Coverage:
    """Compare what every load case asks with the developed bars at ``count`` stations a span."""
    standing = stand(designed, runs)
    worst: list[Station] = []
    each: tuple[list[Station], list[Station]] = ([], [])
    gaps: list[Gap] = []
    for span in range(1, len(designed.outline.lengths) + 1):
        demand = demand_of(designed, span, count)
        for face in FACES:
            provided = provide(designed, standing, face, demand.x, np.full(len(demand.x), span))
            ratio = ratios(demand.side(face), provided, yield_force(designed))
            worst.append(_station(designed, demand, face, provided, int(ratio.argmax())))
            gaps += _gaps(designed, demand, face, provided, ratio)
            for found, values in zip(each, _apart(designed, demand, face, provided), strict=True):
                index = _worst_in(demand.side(face), values, 0, len(values) - 1)
                found.append(_station(designed, demand, face, provided, index))
            turned = worst_turned(designed, standing, face, span)
            if turned is not None:
                each[1].append(_with_torsion(designed, standing, face, span, turned))
    governing = max(worst, key=lambda s: s.ratio)
    return Coverage(governing, tuple(worst), tuple(each[0]), tuple(each[1]), tuple(gaps))


def _apart(
    designed: Designed, demand: SpanDemand, face: Face, provided: Provided
) -> tuple[Floats, Floats]:
    """Return the ratios of the moment and, between the faces, of the tension."""
    side = demand.side(face)
    tension = ratios_of(side.F, provided.A * yield_force(designed))
    start, end = designed.outline.faces(demand.span)
    clear = (demand.x >= start) & (demand.x <= end)
    return ratios_of(side.M, provided.M_r), np.where(clear, tension, -1.0)


def _station(
    designed: Designed, demand: SpanDemand, face: Face, provided: Provided, index: int
) -> Station:
    side = demand.side(face)
    M_f, F = float(side.M[index]), float(side.F[index])
    M_r, F_r = float(provided.M_r[index]), float(provided.A[index]) * yield_force(designed)
    by_moment = ratio_of(M_f, M_r) >= ratio_of(F, F_r)
    row = int(side.M_row[index] if by_moment else side.F_row[index])
    return Station(
        face, demand.span, float(demand.x[index]), float(demand.local[index]), M_f, M_r, F, F_r,
        row, designed.forces.cases[row],
    )  # fmt: skip


def _with_torsion(
    designed: Designed, standing: Sequence[Standing], face: Face, span: int, turned: TurnedStation
) -> Station:
    """Return a section of shear as a station, its tension with torsion."""
    demand = demand_at(designed, span, np.array([turned.local]))
    provided = provide(designed, standing, face, demand.x, np.array([span]))
    plain = _station(designed, demand, face, provided, 0)
    case = designed.forces.cases[turned.row]
    return replace(
        plain, F=turned.F, F_r=turned.F_r, row=turned.row, case=case, column=turned.column
    )


def _gaps(
    designed: Designed, demand: SpanDemand, face: Face, provided: Provided, ratio: Floats
) -> list[Gap]:
    """Return the stretches in which the ratio exceeds 1."""
    bad = np.flatnonzero(ratio > 1 + ROUND_OFF)
    if not len(bad):
        return []
    breaks = np.flatnonzero(np.diff(bad) > 1)
    firsts = [int(bad[0]), *(int(bad[i + 1]) for i in breaks)]
    lasts = [*(int(bad[i]) for i in breaks), int(bad[-1])]
    made = []
    for a, b in zip(firsts, lasts, strict=True):
        worst = _worst_in(demand.side(face), ratio, a, b)
        at = _station(designed, demand, face, provided, worst)
        made.append(Gap(face, demand.span, float(demand.x[a]), float(demand.x[b]), at))
    return made


def _worst_in(side: Side, ratio: Floats, a: int, b: int) -> int:
    """Return the worst station of a stretch: of those without bars, that of the largest moment."""
    worst = int(ratio[a : b + 1].argmax()) + a
    if np.isfinite(ratio[worst]):
        return worst
    none = np.flatnonzero(np.isinf(ratio[a : b + 1])) + a
    return int(none[side.M[none].argmax()])


def worst_of(found: Coverage, face: Face, *, tension: bool) -> Station:
    """Return the station that the moment of a face uses most, or its tension with shear."""

    def ratio(station: Station) -> tuple[float, float]:
        pair = (station.F, station.F_r) if tension else (station.M_f, station.M_r)
        used = ratio_of(*pair)
        return used, pair[0] if used == np.inf else 0.0  # of those without bars, the most is asked

    stations = found.by_tension if tension else found.by_moment
    return max((s for s in stations if s.face == face), key=ratio)


COVERAGE = "coverage"
"""With what the keys of all parts of the cover begin."""


def gap_key(number: int) -> str:
    """Return the key of the part of a gap, counted from 1 as in ``Coverage.gaps``."""
    return f"{COVERAGE}-gap-{number}"


def worst_key(face: Face, *, tension: bool) -> str:
    """Return the key of the part of the station that a face's moment or tension uses most."""
    return f"{COVERAGE}-{face}{'-tension' if tension else ''}"
