"""Forces of an office's frame analysis in the place of our own: one load case a case of the file.

Between two neighbouring stations i and j of the file the load is taken uniform: V is linear, and M
is the straight line between M_i and M_j plus the moment of that load on the piece,
w (x - x_i)(x_j - x)/2. So M and V at the stations are those of the file, M has no steps, and where
the file rounds its numbers neither is adjusted to the other. A change of V within a station is a
point load. Sign convention as in ``analysis.curves``. N and mm.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from lineproof.beams.analysis.arrangements import LoadCase
from lineproof.beams.analysis.curves import Curves, Extremes, Floats, Side
from lineproof.beams.analysis.imported import Imported
from lineproof.beams.analysis.model import Beam, PointLoad
from lineproof.beams.analysis.solve import Row, Solution
from lineproof.beams.continuous.forces import Forces
from lineproof.errors import UserError

SHORT = 10.0
"""Load on a piece no longer than this is a point load [mm]: files write a station twice, or two
stations close to each other."""
AT = 1e-6
"""Distance within which a place is a station [mm]."""


@dataclass(frozen=True, eq=False, slots=True)
class ForcesFile:
    """A file of forces as read: name, SHA-256, its forces, and the file of reactions if given."""

    name: str
    digest: str
    imported: Imported
    reactions_name: str = ""
    reactions_digest: str = ""
    reactions: Mapping[LoadCase, tuple[float, ...]] | None = None


@dataclass(frozen=True, eq=False, slots=True)
class ImportedCurves(Curves):
    """Curves whose shear is the file's and whose moment, ``drawn``, passes through the file's."""

    drawn: Curves

    def combined(self, factors: Floats) -> ImportedCurves:
        """Return the curves of cases that are sums of these: ``factors`` is (new, cases)."""
        return ImportedCurves(
            self.length,
            self.EI,
            self.breaks,
            factors @ self.w,
            factors @ self.P,
            factors @ self.M0,
            factors @ self.V0,
            factors @ self.slope0,
            factors @ self.y0,
            self.drawn.combined(factors),
        )

    def moment(self, x: Floats) -> Floats:
        """Return M [N.mm] at the stations x: shape (cases, stations)."""
        return self.drawn.moment(x)

    def shear(self, x: Floats, side: Side = "right") -> Floats:
        """Return V [N] at the stations x; at a station of the file, on the side asked for."""
        away = np.abs(x[:, None] - self.breaks)
        nearest = away.argmin(axis=1)
        snapped = np.where(away.min(axis=1) <= AT, self.breaks[nearest], x)
        return Curves.shear(self, snapped, side)

    def moment_extremes(self) -> Extremes:
        """Return largest and smallest M of every case: at a station, or level between two."""
        return self.drawn.moment_extremes()

    def inflections(self, case: int = 0) -> tuple[float, ...]:
        """Return the stations inside the span at which M changes its sign."""
        return self.drawn.inflections(case)

    def _deflections_known(self) -> None:
        """Refuse slopes and deflections: a file of forces knows none."""
        raise _no_deflections()


def _no_deflections() -> UserError:
    return UserError(
        "forces_csv: deflections cannot be found from moments of factored cases without load "
        "types; take them from the frame analysis, or leave forces_csv out"
    )


@dataclass(frozen=True, slots=True)
class Piece:
    """Two neighbouring stations [mm] and where their numbers stand in the file's table.

    ``i`` and ``j`` are columns of the file's arrays. Moments may stand on the other side of a
    station that is written twice: the larger of the two is taken.
    """

    x_i: float
    x_j: float
    i: int
    j: int


@dataclass(frozen=True, eq=False)
class ImportedForces(Forces):
    """Forces of a file. ``pieces`` holds by span the pieces from left to right."""

    file: ForcesFile | None = None
    pieces: tuple[tuple[Piece, ...], ...] = ()

    @property
    def source(self) -> ForcesFile:
        """The file."""
        if self.file is None:
            msg = "forces without a file"
            raise ValueError(msg)
        return self.file

    def piece(self, span: int, x: float, side: Side = "right") -> Piece:
        """Return the piece that a place lies in; at a station the one on the side asked for."""
        pieces = self.pieces[span - 1]
        if side == "left":
            return next((p for p in pieces if x <= p.x_j + AT), pieces[-1])
        return next((p for p in reversed(pieces) if x >= p.x_i - AT), pieces[0])

    def has_torsion(self, span: int) -> bool:
        """Tell whether the file gives a span any torsion."""
        columns = [c for p in self.pieces[span - 1] for c in (p.i, p.j)]
        return bool(self.source.imported.T[:, columns].any())

    def imported_torsion(self, span: int, at: Floats) -> Floats:
        """Return T of every case [N.mm], with its sign: (cases, places).

        ``at`` holds places from the left axis of the span [mm]: (places,), or (cases, places)
        where each case has its own. Between two stations T is linear; where a station is written
        twice the larger counts.
        """
        T = self.source.imported.T
        places = np.broadcast_to(at, (len(T), np.shape(at)[-1]))
        made = np.zeros(places.shape)
        for piece in self.pieces[span - 1]:
            share = (places - piece.x_i) / (piece.x_j - piece.x_i)
            here = (places >= piece.x_i - AT) & (places <= piece.x_j + AT)
            T_i, T_j = T[:, [piece.i]], T[:, [piece.j]]
            value = T_i + (T_j - T_i) * np.clip(share, 0.0, 1.0)
            made = np.where(here & (np.abs(value) > np.abs(made)), value, made)
        return made

    def point_torque(self, span: int, low: float, high: float) -> Floats:
        """Return by how much T jumps at stations from low to high [mm], by case [N.mm].

        Both are from the left axis of the span. A jump is a change within a station, or over a
        piece too short to be a length.
        """
        T = self.source.imported.T
        made = np.zeros(len(T))
        pieces = self.pieces[span - 1]
        pairs = [(a.x_j, a.j, b.i) for a, b in pairwise(pieces)]
        pairs += [(p.x_i, p.i, p.j) for p in pieces if p.x_j - p.x_i <= SHORT]
        for x, i, j in pairs:
            if low <= x <= high:
                made += np.abs(T[:, j] - T[:, i])
        return made

    def moment_column(self, row: int, column: int) -> int:
        """Return where the moment at a station stands: the larger, if it is written twice."""
        stations, M = self.source.imported.envelope.stations, self.source.imported.envelope.M
        here = stations[column]
        beside = [
            n for n in (column - 1, column, column + 1)
            if 0 <= n < len(stations) and (stations[n].span, stations[n].x) == (here.span, here.x)
        ]  # fmt: skip
        return max(beside, key=lambda n: (abs(float(M[row, n])), -n))


def imported_forces(beam: Beam, file: ForcesFile) -> ImportedForces:
    """Return the forces of a file on a beam whose spans it was read for."""
    envelope = file.imported.envelope
    count, spans = len(envelope.cases), range(1, len(beam.spans) + 1)
    kinds = [f"load case {n} of {file.name}" for n in range(1, count + 1)]
    rows: tuple[Row, ...] = tuple((kind, span) for kind in kinds for span in spans)
    factors = np.repeat(np.eye(count), len(beam.spans), axis=1)
    pieces = tuple(_pieces(file.imported, span) for span in spans)
    curves = tuple(
        _curves(beam, file.imported, span, pieces[span - 1], len(rows)) for span in spans
    )
    reactions, couples = _support_forces(beam, curves, len(rows))
    rotations = np.full_like(reactions, np.nan)
    solution = Solution(beam, rows, curves, rotations, reactions, couples)
    loads = tuple(
        load for span in spans for load in _point_loads(kinds, span, curves[span - 1], len(spans))
    )
    return ImportedForces(beam, loads, solution, envelope.cases, factors, file=file, pieces=pieces)


def _pieces(imported: Imported, span: int) -> tuple[Piece, ...]:
    stations = imported.envelope.stations
    columns = [n for n, station in enumerate(stations) if station.span == span]
    return tuple(
        Piece(stations[i].x, stations[j].x, i, j)
        for i, j in pairwise(columns)
        if stations[i].x != stations[j].x
    )


def _curves(
    beam: Beam, imported: Imported, span: int, pieces: tuple[Piece, ...], rows: int
) -> ImportedCurves:
    """Return the curves of a span: only the rows of its own span act on it."""
    i, j = [p.i for p in pieces], [p.j for p in pieces]
    breaks = np.array([p.x_i for p in pieces] + [pieces[-1].x_j])
    lengths = np.diff(breaks)
    M, V = _spread(imported.envelope.M, span, rows), _spread(imported.envelope.V, span, rows)
    # Of a station written twice the larger moment: columns of the file, one a break and side.
    at_i, at_j = M[:, i], M[:, j]
    before = np.hstack([at_i[:, :1], at_j])
    after = np.hstack([at_i, at_j[:, -1:]])
    m = np.where(np.abs(after) > np.abs(before), after, before)
    w = (V[:, i] - V[:, j]) / lengths
    zero = np.zeros((rows, 1))
    P = np.hstack([zero, V[:, j[:-1]] - V[:, i[1:]], zero])
    rise = np.diff(m, axis=1) / lengths
    start, end = rise + w * lengths / 2, rise - w * lengths / 2
    steps = np.hstack([zero, end[:, :-1] - start[:, 1:], zero])
    unknown = np.full(rows, np.nan)
    length, EI = beam.spans[span - 1].length, beam.spans[span - 1].EI
    drawn = Curves(length, EI, breaks, w, steps, m[:, 0], start[:, 0], unknown, unknown)
    return ImportedCurves(length, EI, breaks, w, P, m[:, 0], V[:, i[0]], unknown, unknown, drawn)


def _spread(values: Floats, span: int, rows: int) -> Floats:
    """Return the file's rows (cases) as rows (case, span): zero but on their own span."""
    per_case = rows // len(values)
    made = np.zeros((rows, values.shape[1]))
    made[span - 1 :: per_case] = values
    return made


def _support_forces(
    beam: Beam, curves: tuple[ImportedCurves, ...], rows: int
) -> tuple[Floats, Floats]:
    """Return reactions and couples (rows, supports): the jumps of V and M over the supports."""
    reactions, couples = np.zeros((2, rows, len(beam.supports)))
    for number, curve in enumerate(curves):
        reactions[:, number] += curve.V0
        reactions[:, number + 1] -= curve.end_shear
        couples[:, number] += curve.M0
        couples[:, number + 1] -= curve.end_moment
    return reactions, couples


def _point_loads(kinds: list[str], span: int, curves: Curves, spans: int) -> list[PointLoad]:
    """Return the loads that act at a station, or on a piece too short to be a length."""
    made = []
    own = slice(span - 1, None, spans)
    P, w, lengths = curves.P[own], curves.w[own], np.diff(curves.breaks)
    for kind, at_breaks, on_pieces in zip(kinds, P.tolist(), w.tolist(), strict=True):
        loads = dict(zip(curves.breaks.tolist(), at_breaks, strict=True))
        for start, length, size in zip(curves.breaks.tolist(), lengths, on_pieces, strict=False):
            if length <= SHORT:
                loads[start] += size * float(length)
        made += [PointLoad(kind, span, load, x) for x, load in loads.items() if load]
    return made
