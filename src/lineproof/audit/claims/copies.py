"""Slips that only lead to another wrong line: its number written here explains neither of both."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import replace

from lineproof.audit.claims.readings import coarse_roundings
from lineproof.audit.data import Claim, Interval, Slip
from lineproof.audit.slips.rank import sentence_of

Told = Callable[[str], bool]
"""Tells something of a line, by its id."""


def without_results(slips: Sequence[Slip], claim: Claim, is_result: Told) -> tuple[Slip, ...]:
    """Return slips without those that take a value worked from the claim itself: 82 = h - d."""
    kept = [
        (slip, [at for at, cause in enumerate(slip.causes) if not is_result(cause.took)])
        for slip in slips
    ]
    return tuple(
        slip if len(at) == len(slip.causes) else _with(slip, at, claim)
        for slip, at in kept
        if at or not slip.causes
    )


def without_circles(
    slips: Sequence[Slip], claim: Claim, is_wrong: Told, is_later: Told
) -> tuple[Slip, ...]:
    """Return slips without those that take a claimed number which is itself not explained.

    The same slip made in two rows gives each the number of the other. Such a cause comes last, and
    is told in the later row only: that it has the number of the earlier one.
    """
    own, copies = list[Slip](), list[Slip]()
    for slip in slips:
        kept = [at for at, cause in enumerate(slip.causes) if not is_wrong(cause.took)]
        if len(kept) == len(slip.causes):
            own.append(slip)
        elif kept:
            own.append(_with(slip, kept, claim))
        else:
            kept = [at for at, cause in enumerate(slip.causes) if not is_later(cause.took)]
            copies += [_with(slip, kept, claim)] if kept else []
    return (*own, *copies)


def _with(slip: Slip, kept: Sequence[int], claim: Claim) -> Slip:
    """Return a slip with some of its causes, told anew."""
    kinds, causes = (slip.kind, *slip.also), tuple(slip.causes[at] for at in kept)
    first, *others = (kinds[at] for at in kept)
    said = sentence_of(causes, slip.value, claim)
    return replace(slip, kind=first, also=tuple(others), causes=causes, sentence=said)


def stands_alone(claim: Claim, symbol: str, around: Sequence[Interval]) -> bool:
    """Tell whether a claim meets nothing that its line may be, nor is a usual rounding of it."""
    if any(claim.stands_for.meets(each) for each in around):
        return False
    return not any(rounded.usual for rounded in coarse_roundings(claim, symbol, around))
