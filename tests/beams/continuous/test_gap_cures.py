"""Cures of an existing beam with gaps in its bars: each is typed back in, and its check holds.

The beam is that of ``test_gaps``.
"""

from __future__ import annotations

import pytest

from lineproof.sheet import Sheet

from .flow import CALLS, run, start
from .test_gaps import (
    BESIDE,
    D_TOP,
    EXISTING,
    L_20,
    L_25_TOP,
    LEFT,
    OVER,
    RIGHT,
    Row,
    built,
    cure,
    swapped,
)


@pytest.fixture(scope="module")
def sheet() -> Sheet:
    """The sheet of the beam with gaps."""
    return built()[1]


def checked(part: str, check: str, runs: list[Row], calls: tuple[str, ...] = CALLS) -> bool:
    """Whether a check of a part holds with other bars along the beam."""
    return bool(run(start(**EXISTING, bar_runs=runs), calls).entries_of(part)[check])


def test_bars_that_stand_are_told_as_better_developed(sheet: Sheet) -> None:
    """3-25M end 298.5 of 1435.5 mm beyond the section of shear, 0.9*446.1 mm from the face.

    They count to 20 % there, and 423.8 kN ask for 1246.4 of 1500 mm2: 84 %, begun at 4.19 m.
    """
    x = 5800 - 0.9 * D_TOP
    assert [int(100 * (x - at) / L_25_TOP) for at in (5100, 4190, 4200)] == [20, 84, 83]
    assert ("the 3-25M that stand here, now developed to 20 %, developed to 84 % or more") in cure(
        sheet, "shear-1-right"
    )
    through = CALLS[: CALLS.index("shear") + 1]
    for begin, holds in (("4.19 m", True), ("4.20 m", False)):
        runs = swapped(OVER, OVER | {"start": begin})
        assert checked("shear-1-right", "bars-tension-side", runs, through) is holds


def test_bars_at_a_wall_are_told_as_better_developed(sheet: Sheet) -> None:
    """4-20M end 250 of 683.6 mm beyond the face: 36 %. 150.58 kN ask for 442.9 mm2: 36.9 %."""
    assert [int(100 * length / L_20) for length in (250, 253)] == [36, 37]
    assert ("the 4-20M that stand here, now developed to 36 %, developed to 37 % or more") in cure(
        sheet, "anchorage-end-1-bottom"
    )
    for end, holds in ((-0.103, True), (-0.101, False)):  # 253 mm: 444.1 mm2; 251: 440.6 mm2
        runs = swapped(LEFT, LEFT | {"start": f"{end} m"})
        assert checked("anchorage-end-1-bottom", "bars-end-support", runs) is holds


def test_no_number_of_bars_is_told_where_those_that_stand_are_not_enough() -> None:
    """3-15M that count to 20 %: all of their 600 mm2 would not do, further bars are asked for."""
    sheet = built([LEFT, RIGHT, OVER | {"bars": "3-15M"}, *BESIDE])[1]
    text = cure(sheet, "shear-1-right")
    assert "mm² of bars developed here or more" in text
    assert "-15M)" not in text
