"""Which slips a checker would name first."""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Iterable, Sequence
from typing import NamedTuple

from lineproof.audit.data import Claim, Slip
from lineproof.audit.slip_edits import Edit
from lineproof.audit.slip_kinds import FAMILIES

MOST = 8
"""So many slips of one line are told."""
LEAST_LIKELY = 2e-4
"""Below this share a fit is as good as chance, and is not told."""
SELECTED = frozenset((
    "pair", "edition", "factor", "legs", "bar count", "diameter", "tributary", "clear span",
))  # fmt: skip
"""Families of edits that are each known from practice: each keeps more than an even part."""
AGAIN = 0.5
"""Each further slip of a kind counts so much less than the one before."""
_SAME = 1e-9


class Fit(NamedTuple):
    """An edit that reproduces the claim: its value and half width at the claim, and its share.

    ``where`` says in which line, if not in the claimed one.
    """

    edit: Edit
    value: float
    half: float
    share: float
    where: str = ""


def shares(edits: Sequence[Edit]) -> dict[str, float]:
    """Return the share of one edit of each family: the family's share over its different values."""
    different = Counter(
        family for family, _, _ in {(edit.family, edit.at, edit.value) for edit in edits}
    )
    return {
        family: FAMILIES[family].share / count ** (0.5 if family in SELECTED else 1.0)
        for family, count in different.items()
    }


def likely(fit: Fit, claim: Claim) -> float:
    """Return how likely a fit is beside others: its share, less where it is far-fetched or loose.

    A wide result is met by more claims than a narrow one, so that it says less when it is met.
    """
    own = claim.stands_for.half
    width = own + fit.half
    off = abs(fit.value - claim.stands_for.middle) / width if width else 0.0
    narrow = own / width if width else 1.0
    return fit.share * math.exp(-fit.edit.far - 0.7 * off**2) * math.sqrt(max(narrow, 0.02))


def ranked(fits: Iterable[Fit], claim: Claim) -> tuple[Slip, ...]:
    """Return the slips, the most plausible first; the same value found twice is told once."""
    ordered = sorted(
        ((likely(fit, claim), order, fit) for order, fit in enumerate(fits)),
        key=lambda row: (-row[0], row[1]),
    )
    groups: list[tuple[float, Fit, list[str]]] = []
    for share, _, fit in ordered:
        kind = FAMILIES[fit.edit.family].kind
        same = next((kinds for _, other, kinds in groups if _equal(other.value, fit.value)), None)
        if same is None:
            groups.append((share, fit, [kind]))
        elif kind not in same:
            same.append(kind)
    return tuple(
        Slip(kinds[0], _sentence(fit, claim), fit.value, share, tuple(kinds[1:]))
        for share, fit, kinds in _varied(groups)[:MOST]
        if share >= LEAST_LIKELY
    )


def _varied(groups: list[tuple[float, Fit, list[str]]]) -> list[tuple[float, Fit, list[str]]]:
    """Order slips so that many of one kind, nearly alike, do not push out the other kinds."""
    met: Counter[str] = Counter()
    weighed = []
    for share, fit, kinds in groups:
        weighed.append((share * AGAIN ** met[kinds[0]], fit, kinds))
        met[kinds[0]] += 1
    return sorted(weighed, key=lambda row: -row[0])


def _equal(first: float, second: float) -> bool:
    return abs(first - second) <= _SAME * max(abs(first), abs(second))


def _sentence(fit: Fit, claim: Claim) -> str:
    how = "exactly" if claim.stands_for.holds(fit.value) else "within the digits of its arguments"
    return f"Reproduced {how} with {fit.edit.words()}{fit.where}."
