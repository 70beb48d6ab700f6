"""Choosing the stirrups of a whole beam: at most two spacings, alike over the beam.

The order: spacings in steps of 25 mm, at most one near the supports and one between, alike over
all spans; then least mass; then few zones. The stirrups are nowhere below the minimum.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.shear_arrays import Truths
from lineproof.beams.continuous.shear_resistance import MOST_STRAIN
from lineproof.beams.continuous.shear_state import SpanState
from lineproof.beams.continuous.stirrups import FROM_FACE, SpanLayout, changes, grid, lay
from lineproof.errors import UserError

RESERVE = 0.999
"""Part of the resistance that may be used: a thousandth is kept for what lies between stations."""
_ROOM = 1 + 1e-12
_MORE = 60
"""Most spacings by which an end zone is made longer for the change of spacing."""


@dataclass(frozen=True, eq=False)
class Fitting:
    """What a span asks of its stirrups, from the face of the left support, sorted.

    ``u`` the stations, ``required`` the 1/s for strength and ``allowed`` the largest spacing at
    each; ``weight`` is proportional to the mass of one stirrup.
    """

    clear: float
    h: float
    d_bs: float
    u: Floats
    required: Floats
    allowed: Floats
    weight: float

    @classmethod
    def of(cls, state: SpanState) -> Fitting:
        """Take what counts from the state of a span: at a load, of both its sides."""
        basis, (start, end) = state.basis, state.faces
        u, place = np.unique(state.columns - start, return_inverse=True)
        required, allowed = np.zeros(len(u)), np.full(len(u), np.inf)
        np.maximum.at(required, place, state.required / RESERVE)
        np.minimum.at(allowed, place, state.largest_spacing)
        return cls(
            end - start, state.h, basis.d_bs, u, required, allowed,
            2 * (basis.b_w + state.h - 4 * basis.cover),
        )  # fmt: skip

    @cached_property
    def widest(self) -> Floats:
        """The widest spacing at each station."""
        strength = np.full_like(self.required, np.inf)
        np.divide(1.0, self.required, out=strength, where=self.required > 0)
        made: Floats = np.minimum(strength, self.allowed) * _ROOM
        return made

    def passes(self, spacing: float) -> Truths:
        """Tell at which stations a spacing is close enough."""
        made: Truths = self.widest >= spacing
        return made

    def run(self, spacing: float) -> tuple[float, float] | None:
        """Return the longest stretch over which a spacing passes at every station."""
        passed = np.zeros(len(self.u) + 2, dtype=bool)
        passed[1:-1] = self.passes(spacing)
        edges = np.flatnonzero(passed[1:] != passed[:-1]).reshape(-1, 2)
        if not len(edges):
            return None
        starts, ends = self.u[edges[:, 0]], self.u[edges[:, 1] - 1]
        longest = int((ends - starts).argmax())
        return float(starts[longest]), float(ends[longest])


@dataclass(frozen=True, slots=True)
class _Pair:
    """An end spacing with a middle spacing; no layout with them weighs less than ``least``."""

    least: float
    end: float
    spacing: float
    runs: tuple[tuple[float, float] | None, ...]


def choose_layouts(states: Sequence[SpanState]) -> tuple[SpanLayout, ...]:
    """Return the layout of every span; raises :class:`UserError` where no stirrups can do.

    Where the bars are too weak for the method, the stirrups are those at the largest strain it
    knows; the check of the strain then fails.
    """
    refuse_open(states)
    _refuse_crushed(states)
    fits = [Fitting.of(state) for state in states]
    spacings = grid(states[0].basis.d_bs)
    most = min(float(fit.widest.min()) for fit in fits)
    closest = [s for s in spacings if s <= most]
    if not closest:
        raise UserError(list(_too_close(states, fits, spacings[-1])))
    best: tuple[float, int, tuple[SpanLayout, ...]] | None = None
    for pair in _pairs(fits, spacings, closest):
        if best is not None and pair.least > best[0] * _ROOM:
            break
        layouts = tuple(
            fit_layout(fit, run, pair.end, pair.spacing)
            for fit, run in zip(fits, pair.runs, strict=True)
        )
        mass = sum(x.number * fit.weight for x, fit in zip(layouts, fits, strict=True))
        zones = sum(layout.zones for layout in layouts)
        if best is None or mass * _ROOM < best[0] or (mass < best[0] * _ROOM and zones < best[1]):
            best = mass, zones, layouts
    assert best is not None  # the closest spacing alone passes everywhere  # noqa: S101
    return best[2]


def _pairs(
    fits: Sequence[Fitting], spacings: Sequence[float], closest: Sequence[float]
) -> list[_Pair]:
    """Return the pairs of spacings, those that may weigh least first; equals widest first."""
    found = []
    widest = max(float(fit.widest.max()) for fit in fits)
    for spacing in (s for s in spacings if s <= widest):
        runs = tuple(fit.run(spacing) for fit in fits)
        for end in (s for s in closest if s <= spacing):
            if spacing == end or any(runs):
                least = sum(
                    fit.weight * _least_number(fit.clear, run, end, spacing)
                    for fit, run in zip(fits, runs, strict=True)
                )
                found.append(_Pair(least, end, spacing, runs))
    return sorted(found, key=lambda pair: (pair.least, -pair.end, -pair.spacing))


def _least_number(
    clear: float, run: tuple[float, float] | None, end: float, spacing: float
) -> float:
    """Return a number of stirrups below which no layout can be, from the lengths alone."""
    covered = clear - 2 * FROM_FACE
    ends = covered if run is None else max(run[0] + clear - run[1] - 2 * FROM_FACE, 0.0)
    return 1 + ends / end + (covered - ends) / spacing


def fit_layout(
    fit: Fitting, run: tuple[float, float] | None, end: float, spacing: float
) -> SpanLayout:
    """Return the layout of the fewest stirrups, then zones; all at the end spacing if none fits."""
    uniform = lay(fit.clear, end, end, 0, 0, fit.d_bs)
    assert uniform is not None  # without end zones every span can be laid out  # noqa: S101
    if run is None:
        return uniform
    low, high = run[0], fit.clear - run[1]
    start = tuple(max(math.ceil((each - FROM_FACE) / end), int(each > 0)) for each in (low, high))
    left, right = start
    found: SpanLayout | None = None
    for _ in range(_MORE):
        layout = lay(fit.clear, end, spacing, left, right, fit.d_bs)
        wrong = (False, False) if layout is None else _short_ends(fit, layout, run)
        if layout is None or not any(wrong):
            found = layout
            break
        left, right = left + wrong[0], right + wrong[1]
    # The outer stirrups move a little with what is left over: a longer zone at one end may spare
    # more at the other.
    for a in range(start[0], left + 2):
        for b in range(start[1], right + 2):
            other = lay(fit.clear, end, spacing, a, b, fit.d_bs)
            if other is not None and (found is None or _order(other) < _order(found)):
                found = found if any(_short_ends(fit, other, run)) else other
    return uniform if found is None or _order(uniform) <= _order(found) else found


def _order(layout: SpanLayout) -> tuple[int, int]:
    return layout.number, layout.zones


def _short_ends(fit: Fitting, layout: SpanLayout, run: tuple[float, float]) -> tuple[bool, bool]:
    """Tell which end zones end before the wide spacing passes, or too near to it (11.3.7)."""
    wrong = [layout.left_end < run[0], layout.right_start > run[1]]
    for change in changes(layout.bands(), fit.h):
        inside = slice(*np.searchsorted(fit.u, [change.start - 1e-6, change.end + 1e-6]))
        asked = fit.required[inside]
        if (asked > change.counted(fit.u[inside], fit.h) * (1 + 1e-12)).any():
            wrong[change.at == layout.right_start] = True
    return wrong[0], wrong[1]


def _refuse_crushed(states: Sequence[SpanState]) -> None:
    """Refuse spans whose web is too small, which neither stirrups nor bars help."""
    faults = [fault for state in states for fault in _crushed(state)]
    if faults:
        raise UserError(faults)


def refuse_strained(states: Sequence[SpanState]) -> None:
    """Refuse spans whose bars leave the strain out of the range of the method.

    That is so where the bars are open and all that moment, shear and torsion ask for stand.
    """
    faults = [fault for state in states for fault in _strained(state)]
    if faults:
        raise UserError(faults)


def refuse_open(states: Sequence[SpanState]) -> None:
    """Refuse stirrups that are not closed where torsion counts."""
    faults = [fault for state in states for fault in _open_with_torsion(state)]
    if faults:
        raise UserError(faults)


def _open_with_torsion(state: SpanState) -> Iterator[str]:
    """Refuse stirrups that are not closed, or of more legs, where torsion counts."""
    counts = state.v["counts"]
    if not counts.any():
        return
    torsion = state.numbers.torsion
    assert torsion is not None  # it counts  # noqa: S101
    T = float(np.where(counts, state.v["T_all"], 0.0).max()) / 1e6
    limit = 0.25 * torsion.values["T_cr"] / 1e6
    where = f"span {state.numbers.span}: its torsion of {T:.1f} kN.m is above {limit:.1f} kN.m, a "
    where += "quarter of that which cracks the section"
    if not state.basis.closed:
        yield (
            f"closed_stirrups: {where}, but the stirrups are open; write closed_stirrups = True: "
            "closed, with hooks of 135 degrees"
        )
    if state.basis.legs != 2:  # noqa: PLR2004 - the legs that go around the section
        yield f"stirrup_legs: {where}, but {state.basis.legs} are given; write 2 legs, closed"


def _strained(state: SpanState) -> Iterator[str]:
    v, span = state.v, state.numbers.span
    strain = v["eps_asked"]
    row, column = np.unravel_index(int(strain.argmax()), strain.shape)
    if strain[row, column] <= MOST_STRAIN:
        return
    face = "bottom" if v["bottom"][row, column] else "top"
    yield (
        f"{face}_bars: span {span}, {state.columns[column] / 1000:.2f} m from its left axis: the "
        f"longitudinal strain leaves the range of the general method; write more {face} bars "
        "there, or a deeper beam"
    )


def _crushed(state: SpanState) -> Iterator[str]:
    worst = state.crushing
    row, column = np.unravel_index(int(worst.argmax()), worst.shape)
    if worst[row, column] <= 1:
        return
    v = state.v
    yield (
        f"b_w: span {state.numbers.span}, {state.columns[column] / 1000:.2f} m from its left axis: "
        f"shear {'and torsion use' if v['counts'][row, column] else 'uses'} "
        f"{100 * worst[row, column]:.0f} % of what the web carries before it crushes, which no "
        "stirrups help; write a wider web, a deeper beam or stronger concrete"
    )


def _instead(state: SpanState) -> str:
    """Return what helps beside thicker stirrups: more legs only where no torsion goes around."""
    return "a larger section" if state.v["counts"].any() else "more legs"


def _too_close(states: Sequence[SpanState], fits: Sequence[Fitting], least: float) -> Iterator[str]:
    for state, fit in zip(states, fits, strict=True):
        needed = fit.widest
        column = int(needed.argmin())
        if needed[column] >= least:
            continue
        yield (
            f"stirrup: span {state.numbers.span}, {state.columns[column] / 1000:.2f} m from its "
            f"left axis: {state.basis.legs} legs {state.basis.stirrup} would have to stand at "
            f"{needed[column]:.0f} mm, closer than the {least:g} mm that leave room for placing "
            f"the concrete; write thicker stirrups or {_instead(state)}"
        )
