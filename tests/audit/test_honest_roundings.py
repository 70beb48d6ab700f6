"""Honest sheets on which every number is coarse: none is called an error, none is doubted."""

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


@pytest.mark.parametrize("way", WAYS)
def test_who_rounds_all_numbers_is_asked_nothing(
    tallies: dict[str, Counter[Verdict]], way: str
) -> None:
    tally = tallies[f"{way}, habit"]

    assert tally.total() > 80  # more than eight a beam: not an empty count
    assert set(tally) <= ROUNDED, tally


def test_numbers_are_written_coarsely_by_hand() -> None:
    """453.15 has two digits as 450; 45.3 loses none behind the point; 538.95 mm is 540 in fives."""
    graph = beam(0)
    force, size = graph["loads/V_f"], graph["bars/d"]

    assert two_digits(force, 453.15) == "450"
    assert two_digits(force, 45.3) == ""
    assert (fives(size, 538.95), fives(size, 536.0), fives(force, 538.95)) == ("540", "535", "")
