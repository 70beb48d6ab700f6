"""Which slips a checker would name first."""

from __future__ import annotations

import math
import re
from collections import Counter
from collections.abc import Iterable, Sequence
from dataclasses import replace
from typing import NamedTuple

from lineproof.audit.data import Cause, Claim, Slip
from lineproof.audit.slips.edits import Edit
from lineproof.audit.slips.kinds import FAMILIES
from lineproof.sentences import begun

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
BESIDE = 0.1
"""A second cause of the same value is told if it is so likely beside the first."""
_SAME = 1e-9
_LAMBDA = re.compile(r"\blambda_(?!\w)")
"""The name of lambda in formulas, which are read as Python; a checker writes no underscore."""


class Fit(NamedTuple):
    """An edit that reproduces the claim: its value and half width at the claim, and its share.

    ``where`` says in which line, if not in the claimed one; ``above`` is that line's id and ``own``
    its value with the slip. ``against`` is a claimed line that would show the slip, and does not.
    """

    edit: Edit
    value: float
    half: float
    share: float
    where: str = ""
    above: str = ""
    own: float = 0.0
    against: str = ""


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
    """Return the slips, the most plausible first.

    A value found by several kinds is told once, with the words of the two likeliest.
    """
    ordered = sorted(
        ((likely(fit, claim), order, fit) for order, fit in enumerate(fits)),
        key=lambda row: (-row[0], row[1]),
    )
    groups: list[Group] = []
    for share, _, fit in ordered:
        kind = FAMILIES[fit.edit.family].kind
        same = next((group for group in groups if _equal(group.value, fit.value)), None)
        if same is None:
            groups.append(Group(share, {kind: fit}))
        elif share >= BESIDE * same.share:
            same.fits.setdefault(kind, fit)
    return tuple(
        _slip(group, claim) for group in _varied(groups)[:MOST] if group.share >= LEAST_LIKELY
    )


def _slip(group: Group, claim: Claim) -> Slip:
    kind, *others = group.fits
    causes = tuple(map(_cause, group.fits.values()))
    said = sentence_of(causes, group.value, claim)
    return Slip(kind, said, group.value, group.share, tuple(others), causes)


def _cause(fit: Fit) -> Cause:
    edit = fit.edit
    return Cause(
        f"{edit.words()}{fit.where}",
        *edit.swap,
        above=bool(fit.where),
        usual=FAMILIES[edit.family].usual,
        published=edit.published,
        contradicted=bool(fit.against),
    )


class Group(NamedTuple):
    """Fits of one value, one of each kind, the likeliest first, with the share of that one."""

    share: float
    fits: dict[str, Fit]

    @property
    def value(self) -> float:
        """The value at the claim."""
        return next(iter(self.fits.values())).value


def _varied(groups: list[Group]) -> list[Group]:
    """Order slips so that many of one kind, nearly alike, do not push out the other kinds."""
    met: Counter[str] = Counter()
    weighed = []
    for group in groups:
        kind = next(iter(group.fits))
        weighed.append(group._replace(share=group.share * AGAIN ** met[kind]))
        met[kind] += 1
    return sorted(weighed, key=lambda group: -group.share)


def _equal(first: float, second: float) -> bool:
    return abs(first - second) <= _SAME * max(abs(first), abs(second))


def without_underscore(slip: Slip) -> Slip:
    """Return a slip that says lambda as a checker writes it."""
    causes = tuple(replace(c, words=_LAMBDA.sub("lambda", c.words)) for c in slip.causes)
    return replace(slip, sentence=_LAMBDA.sub("lambda", slip.sentence), causes=causes)


def reproduced(cause: Cause, value: float, claim: Claim) -> str:
    """Say what gives the claimed value, and how nearly."""
    how = "exactly" if claim.stands_for.holds(value) else "within the digits of its arguments"
    return f"reproduced {how} with {cause.words}"


def sentence_of(causes: Sequence[Cause], value: float, claim: Claim) -> str:
    """Say what gives the claimed value, and the other cause of the same value that is likeliest."""
    first, *others = causes
    said = f"{begun(reproduced(first, value, claim))}."
    return f"{said} The same value comes with {others[0].words}." if others else said
