"""Cases solved in one call, every arrangement there is, and what a solution leaves over."""

from __future__ import annotations

from collections.abc import Iterable
from itertools import product

import numpy as np

from lineproof.beams.analysis.arrangements import Arrangement, Combination, cases_of, loaded_spans
from lineproof.beams.analysis.envelope import CaseSolution
from lineproof.beams.analysis.solve import Solution


def all_arrangements(spans: int) -> tuple[Arrangement, ...]:
    """Return all 2^n ways to load n spans."""
    chosen = (
        [number for number, loaded in enumerate(choice, start=1) if loaded]
        for choice in product((False, True), repeat=spans)
    )
    return tuple(Arrangement(loaded_spans(loaded), frozenset(loaded)) for loaded in chosen)


def solve_cases(
    solution: Solution, combinations: Iterable[Combination], arrangements: Iterable[Arrangement]
) -> CaseSolution:
    """Return the solution of every combination with every arrangement."""
    cases = cases_of(solution.rows, combinations, arrangements)
    return CaseSolution(solution.combined(cases.factors), cases.names)


def largest_residual(solution: Solution) -> float:
    """Return the largest of what is left over where zero is due, over all rows.

    The reactions less the loads, over the sum of loads; all moments about the right end, over the
    sum of loads times the length; and how far the curves integrated along the spans miss their
    right supports, over the sum of loads times l^3/EI. After redistribution the curves are not
    known, and only the first two count.
    """
    spans, axes = solution.spans, np.array(solution.beam.axes)
    length = float(axes[-1])
    loads = sum(curves.total for curves in spans)
    about = sum(c.load_moment(length - at) for c, at in zip(spans, axes[:-1], strict=True))
    force = solution.reactions.sum(axis=1) - loads
    moment = solution.reactions @ (length - axes) + solution.couples.sum(axis=1) + about
    size = sum(
        float((np.abs(c.w) @ np.diff(c.breaks) + np.abs(c.P).sum(axis=1)).max()) for c in spans
    )
    softest = max(c.length**3 / c.EI for c in spans)
    return max(
        float(np.abs(force).max()) / size,
        float(np.abs(moment).max()) / (size * length),
        _off_level(solution) / (size * softest),
    )


def _off_level(solution: Solution) -> float:
    """Return the worst miss of a support by an integrated curve [mm], or of its slope times l."""
    worst = 0.0
    if not np.isfinite(solution.rotations).all():
        return worst
    for i, curves in enumerate(solution.spans):
        if solution.beam.supports[i + 1].kind == "free":
            continue
        end = np.array([curves.length])
        turn = curves.slope(end)[:, 0] - solution.rotations[:, i + 1]
        miss = np.abs(curves.deflection(end)[:, 0]) + np.abs(turn) * curves.length
        worst = max(worst, float(miss.max()))
    return worst
