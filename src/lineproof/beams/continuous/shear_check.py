"""Demand over resistance of every case at every station, for stirrups as they stand.

Utilisations are arrays (cases, columns): strength, spacing of the stirrups, bars along the beam.
"""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cached_property
from typing import Any

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.shear_arrays import Truths, value
from lineproof.beams.continuous.shear_numbers import SpanEnd
from lineproof.beams.continuous.shear_resistance import MOST_STRAIN
from lineproof.beams.continuous.shear_restrained import tension
from lineproof.beams.continuous.shear_state import Critical, SpanState
from lineproof.beams.continuous.stirrups import Band, Change, changes, effective
from lineproof.beams.continuous.torsion import designed_for
from lineproof.standards.a23_3 import shear_bars, torsion

Indices = np.ndarray[Any, np.dtype[np.intp]]
SMALL = 1e-9
_NEAR = 1e-6
_ABOVE_ALL = 1e30
"""What puts sections that need stirrups and have none before all others."""


@dataclass(frozen=True, slots=True)
class Spot:
    """Which spacing counts at a station: that of its band, or less beside a change."""

    spacing: float
    change: Change | None
    aside: float

    @property
    def counted(self) -> float:
        """The 1/s that counts [1/mm]; zero where no stirrups count."""
        return 1 / self.spacing


@dataclass(frozen=True, eq=False)
class SpanCheck:
    """A span with its stirrups: ``bands`` from the face of the left support."""

    state: SpanState
    bands: tuple[Band, ...]

    @cached_property
    def counted(self) -> tuple[Band, ...]:
        """The bands as they count: infinite spacing where stirrups are below the minimum."""
        most = self.state.minimum_spacing * (1 + 1e-12)
        return tuple(b if b.spacing <= most else Band(b.start, b.end, math.inf) for b in self.bands)

    @cached_property
    def u(self) -> Floats:
        """Stations of the columns from the left face."""
        made: Floats = self.state.columns - self.state.faces[0]
        return made

    @cached_property
    def owners(self) -> Indices:
        """The band that counts at each column: where two meet, the one of the wider spacing."""
        made = np.zeros(len(self.u), dtype=np.intp)
        for n in sorted(range(len(self.bands)), key=lambda n: self.bands[n].spacing):
            band = self.bands[n]
            made[(self.u >= band.start - _NEAR) & (self.u <= band.end + _NEAR)] = n
        return made

    def _owner(self, u: float) -> int:
        inside = [n for n, b in enumerate(self.bands) if b.start - _NEAR <= u <= b.end + _NEAR]
        return max(inside, key=lambda n: self.bands[n].spacing)

    def owner(self, row: int, column: int) -> int:
        """Return the band in which a case is checked at a column."""
        return self._owner(float(self.state.v["x"][row, column]) - self.state.faces[0])

    @cached_property
    def effective(self) -> Floats:
        """The 1/s that counts (cases, columns); at a critical section the least up to the face."""
        state = self.state
        along = effective(self.counted, state.h, self.u)
        made = np.broadcast_to(along, state.v["M"].shape).copy()
        for column, critical in ((0, state.left), (-1, state.right)):
            for x in np.unique(critical.x):
                made[critical.x == x, column] = self.spot_counted(column, float(x))
        return made

    def spot_counted(self, column: int, x: float) -> float:
        """Return the least 1/s between a face and the critical section x from the left axis."""
        return float(effective(self.counted, self.state.h, self._to_face(column, x)).min())

    def _to_face(self, column: int, x: float) -> Floats:
        at = x - self.state.faces[0]
        inside = self.u <= at if column == 0 else self.u >= at
        return np.concatenate([[at], self.u[inside]])

    @cached_property
    def plain(self) -> Truths:
        """Where no stirrups count (cases, columns)."""
        made: Truths = self.effective == 0
        return made

    @cached_property
    def strength(self) -> Floats:
        """Shear, with torsion where it counts, over what resists it."""
        return self.state.utilisation(self.effective, self.plain)

    @cached_property
    def resisted(self) -> Floats:
        """Shear, with torsion, over what resists it; zero where the strain lets none be given."""
        state = self.state
        made: Floats = np.where(
            state.v["eps_asked"] <= MOST_STRAIN * (1 + 1e-12),
            state.resisted(self.effective, self.plain), 0.0,
        )  # fmt: skip
        return made

    @cached_property
    def ranked(self) -> Floats:
        """Strength, to find the section that is used most.

        Where stirrups must stand and none count, every section fails alike: there it is the one
        whose shear is largest beside what the concrete alone resists.
        """
        state = self.state
        alone = np.maximum(state.resisted(self.effective, self.plain), state.hopeless)
        above = _ABOVE_ALL * (1 + alone)
        made: Floats = np.where(state.forbidden(self.plain), above, self.strength)
        return made

    @cached_property
    def spacing(self) -> Floats:
        """Spacing over the largest allowed; zero where no stirrups count or are needed."""
        widths = np.array([b.spacing for b in self.counted])[self.owners]
        made: Floats = np.where(np.isinf(widths), 0.0, widths / self.state.allowed)
        return made

    def at(self, row: int, column: int) -> Spot:
        """Return which spacing counts for a case at a column."""
        state, u = self.state, float(self.u[column])
        if column in (0, len(self.u) - 1):
            critical = state.left if column == 0 else state.right
            places = self._to_face(0 if column == 0 else -1, float(critical.x[row]))
            u = float(places[effective(self.counted, state.h, places).argmin()])
        inside = [b for b in self.counted if b.start - _NEAR <= u <= b.end + _NEAR]
        widest = max(inside, key=lambda band: band.spacing)
        best = Spot(widest.spacing, None, 0.0)
        least = best.counted
        for change in changes(self.counted, state.h):
            if change.start - _NEAR <= u <= change.end + _NEAR:
                here = float(change.counted(np.array(u), state.h))
                if here < least * (1 - 1e-12):
                    least, best = here, Spot(change.closer, change, abs(u - change.at))
        return best

    @cached_property
    def bars(self) -> Mapping[str, Any]:
        """Forces in the bars along the beam with their utilisations (cases, columns)."""
        state, v = self.state, self.state.v
        basis, acting = state.basis, state.numbers.torsion
        most = v["cot"] * self.effective
        w = dict(v) | {"V_s": most - v["cot"] * 2 * v["a_t"] / basis.A_v}
        made: dict[str, Any] = {
            "F_lt": value(shear_bars.TENSION_SIDE, w),
            "F_lc": value(shear_bars.COMPRESSION_SIDE, w),
            "F_le": value(shear_bars.END_SUPPORT, w),
            "V_s": w["V_s"],
        }
        made["F_lc"] = np.maximum(made["F_lc"], 0.0)
        if acting is not None:
            w["V_le"] = value(torsion.SHEAR_IN_BARS, w)
            for name, formula in (
                ("F_lt", torsion.TENSION_SIDE),
                ("F_lc", torsion.COMPRESSION_SIDE),
                ("F_le", torsion.END_SUPPORT),
            ):
                made[name] = np.where(v["counts"], value(formula, w), made[name])
        strength = basis.phi_s * basis.f_y
        force = self._capped(made["F_lt"])
        made["tension"] = force / (strength * np.maximum(v["A_s"], SMALL))
        made["compression"] = made["F_lc"] / (strength * np.maximum(v["A_sp"], SMALL))
        made["bearing"] = np.zeros_like(made["F_le"])
        for column, end in ((0, state.numbers.left), (-1, state.numbers.right)):
            if at_bearing(end):
                force = np.where(v["bottom"][:, column], made["F_le"][:, column], 0.0)
                made["bearing"][:, column] = force / (strength * max(end.A_bearing, SMALL))
        return made

    def bar_forces(self) -> tuple[Floats, Floats, Floats]:
        """Return stations from the left axis and the force bottom and top bars need there [N].

        The largest of all cases, moment, shear and torsion together; zero where torsion does not
        count, for there longer bars stand for the shear (11.3.9.1). Nearer to a support than a
        critical section its values hold.
        """
        nearer, last = self.state.nearer, len(self.u) - 1
        where = np.broadcast_to(np.arange(len(self.u)), nearer.shape)
        ends = np.where(self.state.columns < sum(self.state.faces) / 2, 0, last)
        where = np.where(nearer, ends, where)
        bottom, top = (
            np.take_along_axis(force, where, axis=1).max(axis=0)
            for force in self._by_face(self.state.v["counts"])
        )
        return self.state.columns, bottom, top

    def turned_forces(self) -> tuple[Floats, tuple[Floats, Floats]]:
        """Return stations from the left axis and the force of bottom and top bars there [N].

        By case and column. Zero where torsion does not count, and nearer to a support than a
        critical section, whose values hold there.
        """
        bottom, top = (
            np.where(self.state.nearer, 0.0, force)
            for force in self._by_face(self.state.v["counts"])
        )
        return self.state.v["x"], (bottom, top)

    def bar_areas(self) -> tuple[tuple[Floats, Floats], tuple[Floats, Floats]]:
        """Return the area that bottom and top bars need, and that which counts [mm2].

        By case and column. Zero is needed nearer to a support than a critical section, and where
        torsion does not count, but for the critical sections themselves: there no longer bars
        stand for the shear on the tension side (11.3.9.1), and those on the other side carry the
        tension that shear leaves there (11.3.9.3).
        """
        v, force = self.state.v, self.state.basis.phi_s * self.state.basis.f_y
        there = np.where(v["bottom"], v["A_sp"], v["A_s"])
        here = np.where(v["bottom"], v["A_s"], v["A_sp"])
        asked = v["counts"].copy()
        for column, end in ((0, self.state.numbers.left), (-1, self.state.numbers.right)):
            asked[:, column] |= end.held != "free"
        bottom, top = (np.where(self.state.nearer, 0.0, F / force) for F in self._by_face(asked))
        for column, w in self.state.held.items():
            near = self.state.numbers.left if column == 0 else self.state.numbers.right
            reasons = self.critical("left" if column == 0 else "right").reason
            uncapped = w["counts"][:, 0] | np.array([bool(reason) for reason in reasons])
            F = tension(w, self.effective[:, [column]], self.state.basis)[:, 0]
            most = math.inf if near.A_sr is None else near.A_sr
            needed = np.where(uncapped, F / force, np.minimum(F / force, most))
            top[:, column] = np.maximum(top[:, column], needed)
        return (bottom, here), (top, there)

    def _by_face(self, asked: Truths) -> tuple[Floats, Floats]:
        """Return the force in the bottom and in the top bars, by case, in [N].

        Of either side where it is ``asked``.
        """
        v = self.state.v
        tension = np.where(asked, self._capped(self.bars["F_lt"]), 0.0)
        compression = np.where(asked, self.bars["F_lc"], 0.0)
        bottom = np.where(v["bottom"], tension, compression)
        return bottom, np.where(v["bottom"], compression, tension)

    def designed_torsion(self, T_f: Floats) -> Floats:
        """Return the torsion designed for of that which acts: all, or what is left of it."""
        acting = self.state.numbers.torsion
        return T_f if acting is None else designed_for(acting, T_f)

    def _capped(self, F_lt: Floats) -> Floats:
        """Return the force on the tension side at the ends, capped where 11.3.9.4 lets it."""
        made = F_lt.copy()
        basis, v = self.state.basis, self.state.v
        ends: tuple[tuple[int, End], ...] = ((0, "left"), (-1, "right"))
        for column, end in ends:
            for row in range(len(made)):
                cap = self.cap(end, row)
                if cap is not None and not v["counts"][row, column]:
                    made[row, column] = min(made[row, column], basis.phi_s * basis.f_y * cap)
        return made

    def cap(self, end: End, row: int) -> float | None:
        """Return the area of bars that the largest moment alone requires, if it is a cap here."""
        numbers = self.state.numbers
        column = 0 if end == "left" else -1
        near = numbers.left if end == "left" else numbers.right
        if self.critical(end).reason[row]:
            return None
        return numbers.A_sr if self.state.v["bottom"][row, column] else near.A_sr

    def critical(self, end: End) -> Critical:
        """Return the critical sections of an end."""
        return self.state.left if end == "left" else self.state.right


def at_bearing(end: SpanEnd) -> bool:
    """Tell whether 11.3.9.5 asks for bottom bars at the bearing: exterior and held from below."""
    return end.exterior and end.held == "direct"
