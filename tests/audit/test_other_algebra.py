"""Honest sheets by other algebra: none of their numbers is called wrong."""

from __future__ import annotations

import pytest
from tests.audit.planting_beams import BEAMS
from tests.audit.planting_other_algebra import said_of

from lineproof.audit.data import Verdict

EVERY = 12
ROUNDINGS = (Verdict.SAFE_ROUNDING, Verdict.UNSAFE_ROUNDING)


@pytest.mark.parametrize("full", [False, True], ids=["quick", "full"])
def test_with_steps_of_five_digits_every_number_agrees(*, full: bool) -> None:
    said = list(said_of(range(0, BEAMS, EVERY), 5, 3, full=full))

    assert len(said) > 1000
    assert [(n, j.id, j.note) for n, j in said if j.verdict is not Verdict.AGREES] == []


@pytest.mark.parametrize("full", [False, True], ids=["quick", "full"])
def test_with_steps_of_four_digits_none_is_an_origin(*, full: bool) -> None:
    """Steps of four digits leave the third one open by one: that is a rounding."""
    said = list(said_of(range(0, BEAMS, EVERY), 4, 3, full=full))
    calm = (Verdict.AGREES, *ROUNDINGS)

    assert [(n, j.id, j.note) for n, j in said if j.verdict not in calm] == []
    assert sum(j.verdict in ROUNDINGS for _, j in said) <= len(said) // 1000
