"""Claims with two readings: no error by the one, a likely slip by the other. Nobody can tell which.

A checker does not swallow such a slip, nor call an error what may be none: he asks.
"""

from __future__ import annotations

import math
from collections.abc import Sequence

from lineproof.audit.claims.other_methods import Other
from lineproof.audit.data import Cause, Claim, Slip
from lineproof.audit.graph import Graph

_SAME = 1e-6


def plausible(
    graph: Graph,
    slips: Sequence[Slip],
    claim: Claim,
    way: Other | None = None,
    *,
    places: bool = False,
    loosely: bool = False,
) -> tuple[Slip, Cause] | None:
    """Return the likeliest slip that gives a claim to its last digit, and which of its causes.

    ``loosely`` takes what gives it within the digits of its arguments: beside a reading not to the
    safe side that rests on other values than those claimed.

    None if there is none. Only mistakes that a checker knows by name count, made in the line
    itself: of slips that have as many ways as a number has digits, a place other quantities, or a
    calc unclaimed lines, one fits most numbers. Nor does what is nothing but the other ``way``,
    which puts its own values, or a copy of what is the same number by rights. The same quantity of
    another place counts where ``places`` is true: beside a reading to the unsafe side.
    """

    def known(cause: Cause) -> bool:
        return cause.usual or (places and _is_elsewhere(graph, cause))

    near = (slip for slip in slips if loosely or claim.stands_for.holds(slip.value))
    pairs = ((slip, cause) for slip in near for cause in slip.causes)
    return next(
        (p for p in pairs if known(p[1]) and not _is_same(graph, p[1], claim) and _counts(*p, way)),
        None,
    )


def _is_elsewhere(graph: Graph, cause: Cause) -> bool:
    """Tell whether the same quantity of another place was taken."""
    both = cause.took in graph.stored and cause.replaced in graph.stored
    return both and graph[cause.took].symbol == graph[cause.replaced].symbol


def _is_same(graph: Graph, cause: Cause, claim: Claim) -> bool:
    """Tell whether a value was taken for one that is the same by rights, so that no slip is told.

    A row copied is the same where the two differ by less than the claim differs from its own.
    """
    if not cause.took or cause.replaced not in graph.stored:
        return False
    mine, theirs = graph.stored[cause.replaced], graph.stored[cause.took]
    if cause.replaced == claim.id:
        return abs(theirs - mine) < abs(claim.value - mine)
    return math.isclose(mine, theirs, rel_tol=_SAME)


def _counts(slip: Slip, cause: Cause, way: Other | None) -> bool:
    if cause.above:
        return False
    if way is None:
        return True
    same = math.isclose(slip.value, way.interval.middle, rel_tol=_SAME)
    return cause.took not in way.took and not (same and cause.replaced in way.replaced)


def first_of(slips: Sequence[Slip], slip: Slip) -> tuple[Slip, ...]:
    """Return slips with one of them put first."""
    return (slip, *(other for other in slips if other is not slip))
