"""Claims with two readings: no error by the one, a likely slip by the other. Nobody can tell which.

A checker does not swallow such a slip, nor call an error what may be none: he asks.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace

from lineproof.audit.claims.bench import Bench, Other
from lineproof.audit.claims.handbook import works_others
from lineproof.audit.data import Cause, Claim, Judged, Slip, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.slips.rank import reproduced

_SAME = 1e-6


def beside(
    bench: Bench,
    read: Judged,
    slips: Sequence[Slip],
    way: Other | None = None,
    *,
    loosely: bool = False,
    coarse: bool = False,
) -> Judged:
    """Judge a line that was read as no error: doubtful where a likely slip gives the claim as well.

    ``loosely`` and ``coarse`` are those of :func:`plausible`. A reading of a table by somebody who
    may well read all of them stays one, and a constant of another document is told beside it.
    """
    claim = read.claim
    if claim is None:
        return read
    unsafe = read.verdict is Verdict.UNSAFE_ROUNDING
    found = plausible(bench, slips, claim, way, places=unsafe, loosely=loosely, coarse=coarse)
    if found is not None:
        slip, cause = found
        note = f"{read.note}; the same value is {reproduced(cause, slip.value, claim)}"
        return replace(read, verdict=Verdict.DOUBTFUL, note=note, slips=first_of(slips, slip))
    if way is not None and way.is_read:
        other = plausible(bench, slips, claim, way, coarse=True)
        if other is not None:
            return replace(read, note=f"{read.note}, or with {other[1].words}")
    return read


def plausible(
    bench: Bench,
    slips: Sequence[Slip],
    claim: Claim,
    way: Other | None = None,
    *,
    places: bool = False,
    loosely: bool = False,
    coarse: bool = False,
) -> tuple[Slip, Cause] | None:
    """Return the likeliest slip that gives a claim to its last digit, and which of its causes.

    ``loosely`` takes what gives it within the digits of its arguments: beside a reading not to the
    safe side that rests on other values than those claimed.

    None if there is none. Only mistakes that a checker knows by name count, made in the line
    itself: of slips that have as many ways as a number has digits, a place other quantities, or a
    calc unclaimed lines, one fits most numbers. Two readings are weaker. Beside a ``coarse``
    rounding a constant of another document counts that was used in a line between, of which there
    are few; beside a table, where the author worked such a line elsewhere, any mistake there does
    that is known by name. Nothing but the other ``way``, which puts its own values, counts as
    little as a copy of what is the same number by rights. The same quantity of another place counts
    where ``places`` is true: beside a reading to the unsafe side.
    """
    graph = bench.graph
    worked = way is not None and way.is_read and works_others(bench, graph[claim.id])

    def known(cause: Cause) -> bool:
        if cause.above:
            near = worked or (coarse and cause.published)
            return near and cause.usual and not cause.contradicted
        return cause.usual or (places and _is_elsewhere(graph, cause))

    given = (slip for slip in slips if loosely or claim.stands_for.holds(slip.value))
    pairs = ((slip, cause) for slip in given for cause in slip.causes)
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
    if way is None:
        return True
    same = math.isclose(slip.value, way.interval.middle, rel_tol=_SAME)
    return cause.took not in way.took and not (same and cause.replaced in way.replaced)


def first_of(slips: Sequence[Slip], slip: Slip) -> tuple[Slip, ...]:
    """Return slips with one of them put first."""
    return (slip, *(other for other in slips if other is not slip))
