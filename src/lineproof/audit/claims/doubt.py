"""Claims with two readings: no error by the one, a likely slip by the other. Nobody can tell which.

A checker does not swallow such a slip, nor call an error what may be none: he asks.
"""

from __future__ import annotations

import math
from collections.abc import Sequence

from lineproof.audit.claims.other_methods import Other
from lineproof.audit.data import Cause, Claim, Slip

PLAUSIBLE = 0.15
"""Likelihood from which a slip is set beside a reading that is no error.

Below it stand fits by chance: of any two numbers of three digits, some quantity of the beam put
for another, or a digit typed for another, makes the one from the other.
"""
_SAME = 1e-6


def plausible(
    slips: Sequence[Slip], claim: Claim, way: Other | None = None
) -> tuple[Slip, Cause] | None:
    """Return the likeliest slip that gives a claim to its last digit, and which of its causes.

    None if there is none. A result written wrongly is left out: every rounding differs by some
    digit from what it rounds. So is a slip in lines above that nobody claimed: there are so many
    of them that one fits most numbers. And so is what is nothing but the other ``way``, which puts
    its own values.
    """
    likely = (s for s in slips if s.likely >= PLAUSIBLE and claim.stands_for.holds(s.value))
    pairs = ((slip, cause) for slip in likely for cause in slip.causes)
    return next((pair for pair in pairs if _counts(*pair, way)), None)


def _counts(slip: Slip, cause: Cause, way: Other | None) -> bool:
    if cause.above or cause.miswritten:
        return False
    if way is None:
        return True
    same = math.isclose(slip.value, way.interval.middle, rel_tol=_SAME)
    return cause.took not in way.took and not (same and cause.replaced in way.replaced)


def first_of(slips: Sequence[Slip], slip: Slip) -> tuple[Slip, ...]:
    """Return slips with one of them put first."""
    return (slip, *(other for other in slips if other is not slip))
