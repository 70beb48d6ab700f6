"""What a package calls itself, its lines, and what it warns of: by the kind of what it holds."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

AUDIT_REPORT = "audit report"
"""Kind of member of the record of an audit."""

_STANDARD = (
    "The purchased standard, the local building code and its amendments govern; clause "
    "numbers here point to them and do not replace them."
)
_CAUTIONS = (
    (
        "This package is not valid until it has been reviewed and sealed by the licensed engineer "
        "responsible for the work."
    ),
    _STANDARD,
    "Gravity beams only: the members of this package are not part of the lateral-load system.",
    (
        "Values and rules from memory are listed under “Values to confirm”; the office confirms "
        "each in its own copy of the standard."
    ),
)
_CAUTIONS_OF_AUDITS = (
    (
        "An audit finds what its searches look for. That nothing is found proves no calculation "
        "right: assumptions, loads and drawings stay with the engineers responsible."
    ),
    (
        "A slip named beside a finding gives the claimed value to its digits; that it was made is "
        "likely, not proved."
    ),
    _STANDARD,
)


@dataclass(frozen=True, slots=True)
class Words:
    """The words of a package: ``kind`` on its cover, ``chapter`` over its lines, its cautions."""

    kind: str = "Structural calculation package"
    chapter: str = "Working"
    cautions: tuple[str, ...] = _CAUTIONS


def words_of(members: Iterable[str]) -> Words:
    """Return the words for records of some kinds of member; audits among calcs change nothing."""
    if set(members) == {AUDIT_REPORT}:
        return Words("Audit report of a structural calculation", "Findings", _CAUTIONS_OF_AUDITS)
    return Words()
