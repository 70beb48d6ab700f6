"""Honest sheets on which every number is coarse: none is an error, none doubted without reason."""

from __future__ import annotations

from collections import Counter

import pytest

from lineproof.audit.data import Verdict

from .planting_beams import BEAMS, beam
from .planting_roundings import WAYS, counted, fives, two_digits

ROUNDED = {Verdict.SAFE_ROUNDING, Verdict.UNSAFE_ROUNDING, Verdict.CARRIED}
"""What may be said of a rounding: which way it errs, or that it follows from one that does."""


@pytest.fixture(scope="module")
def tallies() -> dict[str, Counter[Verdict]]:
    """The verdicts on the coarse numbers of every thirtieth beam."""
    return counted(range(0, BEAMS, 30))


ASKED = {"two digits": 0, "sizes to 5 mm": 2}
"""Numbers asked about: a depth and a bar spacing, each with one other size on its sheet.

353.75 mm as 355 is also the depth with 10 mm for the 11.3 mm of the stirrup, and 108.93 mm as 110
the spacing with the same slip; one other size in fives does not tell which.
"""


@pytest.mark.parametrize("way", WAYS)
def test_who_rounds_all_numbers_is_asked_nothing_that_they_tell(
    tallies: dict[str, Counter[Verdict]], way: str
) -> None:
    tally = tallies[f"{way}, habit"]

    assert tally.total() > 80
    assert set(tally) <= ROUNDED | {Verdict.DOUBTFUL}, tally
    assert tally[Verdict.DOUBTFUL] == ASKED[way]


def test_numbers_are_written_coarsely_by_hand() -> None:
    """453.15 has two digits as 450; 45.3 loses none behind the point; 538.95 mm is 540 in fives."""
    graph = beam(0)
    force, size = graph["loads/V_f"], graph["bars/d"]

    assert two_digits(force, 453.15) == "450"
    assert two_digits(force, 45.3) == ""
    assert (fives(size, 538.95), fives(size, 536.0), fives(force, 538.95)) == ("540", "535", "")
