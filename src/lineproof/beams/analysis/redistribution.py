"""Redistribution of support moments (A23.3, 9.2.4), case by case.

The support moments of every case are changed by a given part; the span moments of the same case
follow from statics, loads and end moments. It is never done on an envelope, and not on moments
from coefficients. The limit, (30 - 50 c/d) % and at most 20 %, depends on the section and is
passed in.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray  # noqa: TC002 - as TC001

from lineproof.beams.analysis.curves import Curves, Floats
from lineproof.beams.analysis.envelope import CaseSolution
from lineproof.beams.analysis.model import Beam
from lineproof.beams.analysis.solve import support_forces
from lineproof.errors import FaultList

MOST = 20.0
"""No support moment changes by more than this part [%], whatever the section."""


def redistribute(
    solved: CaseSolution, reductions: Mapping[int, float], limits: Mapping[int, float]
) -> CaseSolution:
    """Return the cases with support moments reduced by ``reductions`` [%] by support number.

    A negative reduction raises them. ``limits`` [%] holds the limit of each of these supports.
    Only hogging moments change; both sides of a support change by the same part, so that a column
    takes its couple in that part too.
    Raises :class:`UserError` with all faults. Deflections of the result are refused.
    """
    beam = solved.solution.beam
    check_reductions(beam, reductions, limits)
    spans = list(solved.solution.spans)
    for support, percent in reductions.items():
        _change(spans, support, percent / 100)
    reactions, couples = support_forces(beam, spans)
    rotations = np.full_like(solved.solution.rotations, np.nan)
    solution = replace(
        solved.solution, spans=tuple(spans), rotations=rotations, reactions=reactions,
        couples=couples,
    )  # fmt: skip
    return CaseSolution(solution, solved.cases)


def _change(spans: list[Curves], support: int, part: float) -> None:
    """Take a part of the hogging moments at a support off both spans beside it."""
    before = spans[support - 2] if support > 1 else None
    after = spans[support - 1] if support <= len(spans) else None
    taken = np.where(_hogging(before, after), part, 0.0)
    if before is not None:
        spans[support - 2] = _shifted(before, right=-taken * before.end_moment)
    if after is not None:
        spans[support - 1] = _shifted(after, left=-taken * after.M0)


def _hogging(before: Curves | None, after: Curves | None) -> NDArray[np.bool_]:
    """Tell for every case whether the top is in tension on either side of the support."""
    left = before is not None and before.end_moment < 0
    right = after is not None and after.M0 < 0
    return np.logical_or(left, right)


def _shifted(curves: Curves, left: Floats | None = None, right: Floats | None = None) -> Curves:
    """Return a span whose end moments are changed, in equilibrium with the same loads."""
    none = np.zeros_like(curves.M0)
    first, last = none if left is None else left, none if right is None else right
    unknown = np.full_like(curves.M0, np.nan)
    return replace(
        curves, M0=curves.M0 + first, V0=curves.V0 + (last - first) / curves.length,
        slope0=unknown, y0=unknown,
    )  # fmt: skip


def check_reductions(
    beam: Beam, reductions: Mapping[int, float], limits: Mapping[int, float]
) -> None:
    """Raise :class:`UserError` with every change of a support moment that cannot be made."""
    faults = FaultList()
    for support, percent in reductions.items():
        name = f"redistribution at support {support}"
        if not 1 <= support <= len(beam.supports):
            faults.add(f"{name}: the beam has {len(beam.supports)} supports")
            continue
        why = _not_free_to_choose(beam, support)
        if why:
            faults.add(f"{name}: {why}; leave it out")
        limit = limits.get(support)
        if limit is None:
            faults.add(f"{name}: no limit given; write the smaller of 30 - 50 c/d and {MOST:g} %")
        elif not 0 <= limit <= MOST:
            faults.add(f"{name}: limit {limit:g} % is outside 0 to {MOST:g} %")
        elif not abs(percent) <= limit:
            faults.add(
                f"{name}: {percent:g} % is more than the limit of {limit:g} %; write at most that"
            )
    faults.raise_if_any()


def _not_free_to_choose(beam: Beam, support: int) -> str:
    """Say why statics alone fix the moment at a support, or nothing."""
    at_end = support in (1, len(beam.supports))
    if at_end:
        kind = beam.supports[support - 1].kind
        only = len(beam.supports) - 1 == 1 and "free" in {s.kind for s in beam.supports}
        if kind in ("simple", "free"):
            return f"the end is {kind} and carries no moment"
        return "the moment of a cantilever follows from its load" if only else ""
    beside = [number for number in (support - 1, support) if beam.cantilever(number)]
    return "the moment of a cantilever follows from its load" if beside else ""
