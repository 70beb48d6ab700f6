"""Moment, shear, slope and deflection along one span, in closed form, for many cases at once.

Every curve is M0 + V0 x minus the loads passed on the way, integrated piece by piece by hand: no
discretisation. Sign convention: x from the left end of the span; loads and deflections positive
downward; M positive where the bottom is in tension; V = dM/dx, positive where the part on the left
is held up; a slope is positive where the beam falls to the right.

Arrays hold one row a case. N and mm.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from lineproof.errors import UserError

Floats = NDArray[np.float64]
Side = Literal["left", "right"]
NEAR = 1e-9
"""Part of a span within which two stations are one."""


@dataclass(frozen=True, eq=False, slots=True)
class Extremes:
    """The largest and the smallest value along a span with their stations; one entry a case."""

    largest: Floats
    x_largest: Floats
    smallest: Floats
    x_smallest: Floats


@dataclass(frozen=True, eq=False, slots=True)
class Curves:
    """One span of a solved beam.

    ``breaks`` (m + 1) are the stations between which loads are constant, ``w`` (cases, m) the
    intensity in each piece [N/mm], ``P`` (cases, m + 1) the point loads at the breaks [N]; ``M0``,
    ``V0``, ``slope0``, ``y0`` (cases) the values at the left end, V0 before a point load there.
    """

    length: float
    EI: float
    breaks: Floats
    w: Floats
    P: Floats
    M0: Floats
    V0: Floats
    slope0: Floats
    y0: Floats

    def combined(self, factors: Floats) -> Curves:
        """Return the curves of cases that are sums of these: ``factors`` is (new, cases)."""
        rows = (self.w, self.P, self.M0, self.V0, self.slope0, self.y0)
        return Curves(self.length, self.EI, self.breaks, *(factors @ row for row in rows))

    def _passed(self, x: Floats) -> tuple[Floats, Floats]:
        """Return distances from piece starts, loaded lengths passed."""
        u = np.maximum(x - self.breaks[:-1, None], 0.0)
        lengths = self.breaks[1:, None] - self.breaks[:-1, None]
        return u, np.minimum(u, lengths)

    def _from_breaks(self, x: Floats) -> Floats:
        """Return distances from the breaks passed."""
        v: Floats = np.maximum(x - self.breaks[:, None], 0.0)
        return v

    def moment(self, x: Floats) -> Floats:
        """Return M [N.mm] at the stations x: shape (cases, stations)."""
        u, c = self._passed(x)
        moment: Floats = self.M0[:, None] + self.V0[:, None] * x - self.w @ (c * (u - c / 2))
        if self.P.any():
            moment -= self.P @ self._from_breaks(x)
        return moment

    def shear(self, x: Floats, side: Side = "right") -> Floats:
        """Return V [N] at the stations x; beside a point load, on the side asked for."""
        _, c = self._passed(x)
        shear: Floats = self.V0[:, None] - self.w @ c
        if self.P.any():
            behind = x > self.breaks[:, None] if side == "left" else x >= self.breaks[:, None]
            shear -= self.P @ behind.astype(float)
        return shear

    def slope(self, x: Floats) -> Floats:
        """Return the slope [rad] at the stations x."""
        self._deflections_known()
        u, c = self._passed(x)
        v = self._from_breaks(x)
        bent = self.M0[:, None] * x + self.V0[:, None] * x**2 / 2
        bent -= self.w @ (c * (3 * u * (u - c) + c**2) / 6) + self.P @ (v**2 / 2)
        return self.slope0[:, None] - bent / self.EI

    def deflection(self, x: Floats) -> Floats:
        """Return the deflection [mm] at the stations x."""
        self._deflections_known()
        u, c = self._passed(x)
        v = self._from_breaks(x)
        bent = self.M0[:, None] * x**2 / 2 + self.V0[:, None] * x**3 / 6
        fourth = c * (4 * u**3 - 6 * u**2 * c + 4 * u * c**2 - c**3) / 24
        bent -= self.w @ fourth + self.P @ (v**3 / 6)
        return self.y0[:, None] + self.slope0[:, None] * x - bent / self.EI

    def _deflections_known(self) -> None:
        if not np.isfinite(self.slope0).all():
            raise UserError(
                "deflection: moments were redistributed; take deflections from the elastic solution"
            )

    @property
    def end_moment(self) -> Floats:
        """M at the right end of every case [N.mm]."""
        return self.moment(np.array([self.length]))[:, 0]

    @property
    def end_shear(self) -> Floats:
        """V at the right end of every case, behind a point load there [N]."""
        return self.V0 - self.total

    @property
    def total(self) -> Floats:
        """All load on the span [N]."""
        total: Floats = self.w @ np.diff(self.breaks) + self.P.sum(axis=1)
        return total

    def load_moment(self, about: float) -> Floats:
        """Return the moment of all load about a station [N.mm], positive for loads right of it."""
        middle = (self.breaks[:-1] + self.breaks[1:]) / 2
        moment: Floats = self.w @ (np.diff(self.breaks) * (middle - about))
        return moment + self.P @ (self.breaks - about)

    def moment_extremes(self) -> Extremes:
        """Return largest and smallest M of every case, exactly: where V is zero, or at a break."""
        at, V, M = self._piece_starts()
        with np.errstate(divide="ignore", invalid="ignore"):
            t = V / self.w
        inside = (t > 0) & (t < np.diff(self.breaks))
        t = np.where(inside, t, 0.0)
        # Where V = w t, the moment gained is V t / 2.
        values = np.hstack([M, self.end_moment[:, None], M + V * t / 2])
        stations = np.hstack([np.broadcast_to(self.breaks, self.P.shape), at + t])
        return _extremes(values, stations)

    def _piece_starts(self) -> tuple[Floats, Floats, Floats]:
        at = self.breaks[:-1]
        return at, self.shear(at), self.moment(at)

    def inflections(self, case: int = 0) -> tuple[float, ...]:
        """Return the stations inside the span at which M changes its sign."""
        at, V, M = self._piece_starts()
        near = NEAR * self.length
        roots: list[float] = []
        for start, end, v, m, w in zip(
            at, self.breaks[1:], V[case], M[case], self.w[case], strict=True
        ):
            found = [start + t for t in _zeros(float(m), float(v), float(w))]
            roots += [x for x in found if start - near <= x <= end + near]
        roots = [x for x in sorted(roots) if near < x < self.length - near]
        apart = [x for x, after in pairwise([*roots, math.inf]) if after - x > near]
        between = [(a + b) / 2 for a, b in pairwise([0.0, *apart, self.length])]
        signs = np.sign(self.moment(np.array(between))[case])
        return tuple(
            float(x) for x, (s, t) in zip(apart, pairwise(signs), strict=True) if s * t < 0
        )


def _extremes(values: Floats, stations: Floats) -> Extremes:
    rows = np.arange(len(values))
    high, low = values.argmax(axis=1), values.argmin(axis=1)
    return Extremes(
        values[rows, high], stations[rows, high], values[rows, low], stations[rows, low]
    )


def _zeros(M: float, V: float, w: float) -> list[float]:
    """Return the t at which M + V t - w t^2/2 = 0, without cancellation."""
    if w == 0:
        return [-M / V] if V != 0 else []
    under = V * V + 2 * w * M
    if under < 0:
        return []
    q = V + math.copysign(math.sqrt(under), V)
    return [q / w, -2 * M / q] if q != 0 else [0.0]
