"""Where the stirrups of a span stand: an end zone each side, a middle zone, the spaces between.

``u`` is measured from the face of the left support [mm]. The first stirrup stands half a spacing
from the face, at most 75 mm (common practice).
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Iterator
from dataclasses import dataclass, replace
from itertools import pairwise

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.layout import StirrupZone

GRID = 25.0
"""Spacings are multiples of this [mm]."""
CLEAR_FOR_PLACING = 75.0
"""Clear space between stirrups for placing the concrete [mm]; common practice."""
FROM_FACE = 75.0
"""Largest distance of the first stirrup from the face [mm]; common practice."""
MOST_SPACING = 600.0
_WHOLE = 5.0
_NEAR = 1e-6


@dataclass(frozen=True, slots=True)
class Band:
    """A stretch of a span with one spacing, from u to u; infinite where no stirrups stand."""

    start: float
    end: float
    spacing: float


@dataclass(frozen=True, slots=True)
class Change:
    """A change of spacing at u, and the reach beside it where the closer stirrups count less."""

    at: float
    start: float
    end: float
    closer: float
    wider: float

    def counted(self, u: Floats, h: float) -> Floats:
        """Return the 1/s that counts in its reach [1/mm]."""
        part = np.minimum(np.abs(u - self.at) / h, 0.5)
        made: Floats = (0.5 + part) / self.closer + (0.5 - part) / self.wider
        return made


@dataclass(frozen=True, slots=True)
class SpanLayout:
    """Stirrups of one clear span, from face to face.

    ``left`` and ``right`` whole spacings of ``end`` stand at the ends and ``middle`` whole spacings
    of ``spacing`` between them; ``rest`` is the one smaller space that remains before the right
    end zone. ``first`` and ``last`` are the distances of the outer stirrups from the faces.
    """

    clear: float
    end: float
    spacing: float
    left: int
    middle: int
    right: int
    first: float
    last: float
    rest: float

    @property
    def number(self) -> int:
        """Number of stirrups."""
        return self.left + self.middle + self.right + 1 + (self.rest > 0)

    @property
    def zones(self) -> int:
        """Number of stretches of different spacing."""
        return 1 + (self.left > 0) + (self.right > 0)

    @property
    def left_end(self) -> float:
        """Where the end zone at the left ends; at the face if there is none."""
        return self.first + self.left * self.end if self.left else 0.0

    @property
    def right_start(self) -> float:
        """Where the end zone at the right starts; at the face if there is none."""
        return self.clear - (self.last + self.right * self.end if self.right else 0.0)

    def bands(self) -> tuple[Band, ...]:
        """Return the stretches of one spacing from face to face."""
        a, b = self.left_end, self.right_start
        made = (Band(0.0, a, self.end), Band(a, b, self.spacing), Band(b, self.clear, self.end))
        return tuple(band for band in made if band.end > band.start)

    def placed(self, span: int, face: float, made_of: StirrupZone) -> tuple[StirrupZone, ...]:
        """Return the zones along the beam; ``face`` is the left face, ``made_of`` one stirrup."""
        rows: list[tuple[float, int, float]] = []
        start = self.first
        if self.left:
            rows.append((start, self.left + 1, self.end))
            start += self.left * self.end + self.spacing
        inside = self.middle + (not self.left) - (self.right > 0 and self.rest == 0)
        if inside:
            rows.append((start, inside, self.spacing))
        at = self.clear - self.last - self.right * self.end
        if self.right:
            rows.append((at, self.right + 1, self.end))
        elif self.rest:
            rows.append((at, 1, self.spacing))
        return tuple(
            replace(
                made_of, span=span, start=face + u, end=face + u + (n - 1) * s, number=n, spacing=s
            )
            for u, n, s in rows
        )


def grid(d_bs: float) -> tuple[float, ...]:
    """Return the spacings to choose from, widest first; the closest leave room for placing."""
    least = math.ceil((CLEAR_FOR_PLACING + d_bs) / GRID - _NEAR)
    return tuple(GRID * n for n in range(int(MOST_SPACING / GRID), least - 1, -1))


def first_distance(spacing: float) -> float:
    """Return the distance of the first stirrup from the face: half a spacing, at most 75 mm."""
    return _WHOLE * math.floor(min(spacing / 2, FROM_FACE) / _WHOLE + _NEAR)


def lay(
    clear: float, end: float, spacing: float, left: int, right: int, d_bs: float
) -> SpanLayout | None:
    """Lay stirrups out over a clear span; None where the end zones leave no middle zone.

    The space that remains is never closer than the clear space for placing: the outer stirrups
    move by a few centimetres instead.
    """
    first = first_distance(end if left else spacing)
    last = first_distance(end if right else spacing)
    between = clear - first - last - (left + right) * end
    if between < 0:
        return None
    middle = math.floor(between / spacing + _NEAR)
    if (left or right) and not middle:
        return None
    moved, rest = evened(first, last, max(between - middle * spacing, 0.0), d_bs)
    first, last = first + moved, last + moved
    return SpanLayout(clear, end, spacing, left, middle, right, first, last, rest)


def least_space(d_bs: float) -> float:
    """Return the least distance of two stirrups, centre to centre, on the module [mm]."""
    return _WHOLE * math.ceil((CLEAR_FOR_PLACING + d_bs) / _WHOLE - _NEAR)


def evened(first: float, last: float, rest: float, d_bs: float) -> tuple[float, float]:
    """Return how far the outer stirrups move from the faces, and the space that remains [mm].

    ``rest`` is the space left over between stirrups at ``first`` and ``last`` from the faces. It
    is closed by moving both inward, at most to :data:`FROM_FACE`; else both move outward until it
    is wide enough for placing.
    """
    least = least_space(d_bs)
    if rest < _NEAR or rest >= least:
        return 0.0, 0.0 if rest < _NEAR else rest
    moved = rest / 2
    if max(first, last) + moved > FROM_FACE:
        moved = (rest - least) / 2
    left = max(rest - 2 * moved, 0.0)
    return moved, 0.0 if left < _NEAR else left


def changes(bands: Iterable[Band], h: float) -> Iterator[Change]:
    """Give the changes of spacing with the reach, h/2 long, in which closer stirrups count less."""
    for one, other in pairwise(bands):
        at = one.end
        if one.spacing < other.spacing:
            yield Change(at, max(at - h / 2, one.start), at, one.spacing, other.spacing)
        elif other.spacing < one.spacing:
            yield Change(at, at, min(at + h / 2, other.end), other.spacing, one.spacing)


def effective(bands: tuple[Band, ...], h: float, u: Floats) -> Floats:
    """Return the 1/s that counts at stations [1/mm] (11.3.7).

    A_v/s changes linearly over a length h centred on a change of spacing. Only what that takes
    from the closer stirrups is counted, not what it gives to the wider ones; at the change itself
    the wider count.
    """
    made = np.full(np.shape(u), np.inf)
    for band in bands:
        inside = (u >= band.start - _NEAR) & (u <= band.end + _NEAR)
        made = np.where(inside, np.minimum(made, 1 / band.spacing), made)
    for change in changes(bands, h):
        inside = (u >= change.start - _NEAR) & (u <= change.end + _NEAR)
        made = np.where(inside, np.minimum(made, change.counted(u, h)), made)
    return made
