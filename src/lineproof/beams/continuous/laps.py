"""Laps of bars: where runs longer than the stock are lapped, and over which length."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

from lineproof.beams.continuous.anchorage import bar_of, develop, holds
from lineproof.beams.continuous.cutoff import STEP, ceil50
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import level_pairs
from lineproof.errors import UserError
from lineproof.standards.a23_3 import laps as clause

HOOK_LEG = 16.0
"""Length of a 90 degree hook beyond the outside of the bar, in bar diameters, at most."""


def lap_length(designed: Designed, run: BarRun) -> float:
    """Return the length of a class B lap of a run, on the module of the ends."""
    return ceil50(develop(designed.basis, bar_of(designed, run)).lap / 2) * 2


def lap_needed(designed: Designed, first: BarRun, second: BarRun) -> float:
    """Return the least length of a class B lap of two runs [mm].

    Of different sizes: the larger of the lap of the thinner and the development of the thicker.
    """
    thin, thick = sorted((first, second), key=lambda run: run.diameter)
    least = develop(designed.basis, bar_of(designed, thin)).lap
    if first.size == second.size:
        return least
    return max(least, develop(designed.basis, bar_of(designed, thick)).l_d)


def lap_between(designed: Designed, first: BarRun, second: BarRun) -> float:
    """Return the length of a lap of two runs, on the module of the ends [mm]."""
    return ceil50(lap_needed(designed, first, second) / 2) * 2


def bad_laps(designed: Designed, runs: Sequence[BarRun]) -> frozenset[tuple[int, int]]:
    """Return the laps that are too short or of bars too thick to be lapped, by places in runs."""
    return frozenset(
        (i, j)
        for i, j in level_pairs(designed.outline, runs)
        if not _laps(designed, runs[i], runs[j])
    )


def _laps(designed: Designed, first: BarRun, second: BarRun) -> bool:
    long_enough = holds(
        clause.LONG_ENOUGH,
        l_s=lap_needed(designed, first, second), l_lp=first.end - second.start,
    )  # fmt: skip
    return long_enough and all(holds(clause.LAPPABLE, d_b=run.diameter) for run in (first, second))


def cut_length(run: BarRun) -> float:
    """Return the length of a bar before bending, an upper bound."""
    hooks = sum(1 for hook in (run.hook_start, run.hook_end) if hook)
    return run.end - run.start + hooks * HOOK_LEG * run.diameter


def split(
    designed: Designed, run: BarRun, places: Sequence[float], others: Sequence[float] = ()
) -> tuple[BarRun, ...]:
    """Return a run in pieces of the stock length.

    Laps are centred on one of the ``places`` along the beam, failing that on one of the
    ``others``, failing that anywhere. Raises :class:`UserError` for bars too thick.
    """
    if cut_length(run) <= designed.stock:
        return (run,)
    if not holds(clause.LAPPABLE, d_b=run.diameter):
        raise UserError(
            f"{run.face} bars {run.number}-{run.size}: {cut_length(run) / 1000:.1f} m is longer "
            f"than the stock of {designed.stock / 1000:g} m, and {run.size} may not be lapped "
            "(12.14.2); write bars of 35M or smaller, or a longer stock"
        )
    half = ceil50(lap_length(designed, run) / 2)
    pieces: list[BarRun] = []
    rest = run
    while cut_length(rest) > designed.stock:
        at = _lap_at(designed, rest, (places, others), half)
        pieces.append(replace(rest, end=at + half, hook_end=""))
        rest = replace(rest, start=at - half, hook_start="")
    return (*pieces, rest)


def _lap_at(
    designed: Designed, rest: BarRun, places: Sequence[Sequence[float]], half: float
) -> float:
    """Return the centre of the next lap: the furthest place that the stock reaches."""
    leg = HOOK_LEG * rest.diameter if rest.hook_start else 0.0
    furthest = min(rest.start + designed.stock - leg - half, rest.end - 3 * half)
    for group in places:
        reached = [x for x in group if rest.start + 3 * half <= x <= furthest]
        if reached:
            return max(reached)
    return furthest // STEP * STEP
