"""An audit of one calculation: claims judged, or the record searched alone; findings in order."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence

import numpy as np

from lineproof.audit.claims.bars import bars_note
from lineproof.audit.claims.conventions import convention_of
from lineproof.audit.claims.judge import judge
from lineproof.audit.claims.on_the_way import rounding_note
from lineproof.audit.data import Audit, Claim, Finding
from lineproof.audit.findings import findings_of, importance
from lineproof.audit.graph import Graph
from lineproof.audit.junior.search import audit_record
from lineproof.audit.search.missing import missing_checks
from lineproof.audit.search.traps import trap_findings
from lineproof.audit.slips.search import searching
from lineproof.record import Record

SEARCHES: tuple[Callable[[Record], tuple[Finding, ...]], ...] = (
    audit_record,
    missing_checks,
    trap_findings,
)
"""The searches of a record by itself."""


def audit_claims(record: Record, claims: Sequence[Claim], graph: Graph | None = None) -> Audit:
    """Return every claim judged, and what a checker writes down about them, by what it matters.

    ``record`` is the right calculation; ``graph`` may be given where it was made already.
    """
    graph = graph or Graph(record)
    with np.errstate(all="ignore"):  # absurd claims lead procedures to infinities: no value
        convention = convention_of(graph, claims)
        judged = judge(graph, claims, searching(), convention)
        said = (
            convention.sentence if convention.ids else "",
            bars_note(graph, claims),
            rounding_note(graph, judged),
        )
        notes = tuple(filter(None, said))
        return Audit(record.calc_id, record.digest, judged, findings_of(graph, judged), notes)


def audit_alone(record: Record, more: Iterable[Finding] = ()) -> Audit:
    """Return what the searches find in a record by itself, with findings found elsewhere."""
    found = [finding for search in SEARCHES for finding in search(record)]
    ordered = sorted(dict.fromkeys([*more, *found]), key=importance)
    return Audit(record.calc_id, record.digest, (), tuple(ordered))
