"""Cures of an existing beam with gaps in its bars: each is typed back in, and its check holds.

The beam is that of ``beam_with_gaps``.
"""

from __future__ import annotations

import re
from typing import Any

import pytest

from lineproof import beams
from lineproof.beams.continuous.cures_tried import failing, failing_of
from lineproof.beams.continuous.resistance_cover import Gap
from lineproof.sheet import Sheet

from .beam_with_gaps import (
    BESIDE,
    D_TOP,
    EXISTING,
    L_20,
    L_25_TOP,
    LEFT,
    OVER,
    RIGHT,
    RUNS,
    Existing,
    Row,
    built,
    cure,
    gaps_of,
    row,
    swapped,
)
from .flow import CALLS, run, start, without_cures
from .notebooks import EXISTING_BEAM, inputs_of

AXIS = "m from the axis of support 1"


@pytest.fixture(scope="module")
def sheet(existing: Existing) -> Sheet:
    """The sheet of the beam with gaps."""
    return existing[1]


def checked(part: str, check: str, runs: list[Row], calls: tuple[str, ...] = CALLS) -> bool:
    """Whether a check of a part holds with other bars along the beam."""
    return bool(run(without_cures(start(**EXISTING, bar_runs=runs)), calls).entries_of(part)[check])


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
    sheet = built([LEFT, RIGHT, OVER | {"bars": "3-15M"}, *BESIDE], cures=True)[1]
    text = cure(sheet, "shear-1-right")
    assert "mm² of bars developed here or more" in text
    assert "-15M)" not in text


# Laps of 20M, class B: 1.3*683.6 = 888.6 mm. 1600 mm more make 2300 + 1600 - 3000 = 900 mm of lap,
# 1550 mm make 850 mm, though the moments would be covered with 1450 mm. Further 4-20M are lapped
# with both of the 4-20M; 3-20M are no lap of these and do not fit beside them, and 2-20M are 600 of
# the 136.26e6/(0.85*400*430) = 930 mm2 needed.
TOLD: list[tuple[tuple[str, ...], str, list[Row], list[Row]]] = [
    (
        ("coverage-bottom",), f"the 4-20M that end 2.30 {AXIS} made 1600 mm longer",
        swapped(LEFT, LEFT | {"end": "3.90 m"}), swapped(LEFT, LEFT | {"end": "3.85 m"}),
    ),
    (
        ("coverage-bottom",), f"the 4-20M that begin 3.00 {AXIS} made 1600 mm longer",
        swapped(RIGHT, RIGHT | {"start": "1.40 m"}), swapped(RIGHT, RIGHT | {"start": "1.45 m"}),
    ),
    (
        ("coverage-bottom",), f"further bars 4-20M from 1.05 to 4.25 {AXIS}",
        [*RUNS, row("bottom", "4-20M", 1.05, 4.25)],
        [*RUNS, row("bottom", "2-20M", 1.05, 4.25)],
    ),
    (
        ("coverage-top", "coverage-gap-5"),
        f"the 3-25M that stand from 5.10 to 6.90 {AXIS} made 1050 mm longer at both ends",
        swapped(OVER, row("top", "3-25M", 4.05, 7.95)),
        swapped(OVER, row("top", "3-25M", 4.10, 7.90)),
    ),
    (
        ("coverage-gap-1",), f"further bars 2-20M from −0.10 to 0.95 {AXIS}",
        [*RUNS, row("bottom", "2-20M", -0.1, 0.95)], [*RUNS, row("bottom", "1-20M", -0.1, 0.95)],
    ),
    (
        ("coverage-gap-4",), f"further bars 2-20M from 11.05 to 12.10 {AXIS}",
        [*RUNS, row("bottom", "2-20M", 11.05, 12.1)], [*RUNS, row("bottom", "1-20M", 11.05, 12.1)],
    ),
]  # fmt: skip
"""Parts, the cure told in them, the bars with it, the bars with a step less."""


def gap_in(beam: beams.ContinuousBeam, part: str) -> Gap:
    """The gap that a part of the cover by bars stands for."""
    gaps = gaps_of(beam)
    if part.startswith("coverage-gap-"):
        return gaps[int(part.removeprefix("coverage-gap-")) - 1]
    face = part.removeprefix("coverage-")
    return next(g for g in gaps if g.face == face and g.worst == float("inf"))


@pytest.mark.parametrize(("parts", "words", "good", "less"), TOLD)
def test_a_told_cure_closes_its_gap_and_fails_nothing_else(
    existing: Existing, parts: tuple[str, ...], words: str, good: list[Row], less: list[Row]
) -> None:
    """Typed in and calculated anew through all calls; with a step less something does not hold."""
    beam, sheet, _ = existing
    assert all(words in cure(sheet, part) for part in parts)
    assert cured(beam, sheet, parts[0], good)
    assert not cured(beam, sheet, parts[0], less)


def cured(beam: beams.ContinuousBeam, sheet: Sheet, part: str, runs: list[Row]) -> bool:
    """Whether other bars close the gap of a part, and nothing fails that did not before."""
    was, changed = gap_in(beam, part), without_cures(start(**EXISTING, bar_runs=runs))
    now = run(changed)
    before, after = gaps_of(beam), gaps_of(changed)
    closed = not [g for g in after if within(was, g)]
    spread = [g for g in after if not any(within(old, g) for old in before)]
    return closed and not spread and failing_of(now.parts) <= failing_of(sheet.parts)


def within(old: Gap, new: Gap) -> bool:
    """Whether a gap lies in one of before."""
    same = (old.face, old.span) == (new.face, new.span)
    return same and old.start <= new.start and new.end <= old.end


def test_every_cure_of_bars_that_is_told_is_typed_in_above(sheet: Sheet) -> None:
    for part in sheet.parts:
        if part.key.startswith("coverage"):
            text = cure(sheet, part.key)
            typed = sum(words in text for parts, words, _, _ in TOLD if part.key in parts)
            assert len(re.findall(r"further bars \d|mm longer", text)) == typed


# The layer of a web of 400 mm takes six bars 20M: (400 - 2*63.8)/5 - 19.5 = 35 mm clear, 30 at
# least; seven stand 25.9 mm apart. That of 350 mm takes five, 36.1 mm apart; six stand 25 mm apart.
FURTHER = [
    ("400 mm", "8 kPa", "2-15M", "4-20M from −0.10 to 5.40", "", row("bottom", "4-20M", -0.1, 5.4)),
    (
        "350 mm", "10 kPa", "4-20M", "2-20M from 0.45 to 4.55", ", in a second layer",
        row("bottom", "2-20M", 0.45, 4.55, layer=2),
    ),
]  # fmt: skip
"""Web, live load, bars that stand, further bars told, their layer, and as they are typed."""


@pytest.mark.parametrize(("b_w", "load", "stand", "told", "layer", "further"), FURTHER)
def test_further_bars_stand_beside_those_of_another_size_else_in_line_above(
    b_w: str, load: str, stand: str, told: str, layer: str, further: Row
) -> None:
    """Beside 2-15M the larger 20M fit; beside 4-20M two more do not, and stand above."""
    inputs = EXISTING | {
        "b_w": b_w, "live_load": load,
        "stirrups": [{"span": k, "spacing": "100 mm"} for k in (1, 2)],
    }  # fmt: skip
    standing = [row("bottom", stand, -0.1, 12.1), row("top", "4-25M", -0.1, 12.1)]
    text = cure(run(start(**inputs, bar_runs=standing)), "coverage-bottom")
    assert f"further bars {told} {AXIS}{layer}" in text
    assert closes(inputs, [*standing, further])
    number = int(further["bars"][0])
    assert not closes(inputs, [*standing, further | {"bars": f"{number - 1}-20M"}])


def closes(inputs: dict[str, Any], runs: list[Row]) -> bool:
    """Whether bars are taken, and leave no gap in the bottom bars of span 1."""
    beam = without_cures(start(**inputs, bar_runs=runs))
    run(beam)
    return not [g for g in gaps_of(beam) if (g.face, g.span) == ("bottom", 1)]


def test_further_bars_as_long_as_those_beside_them_where_shorter_ones_fail_elsewhere() -> None:
    """Of 5-20M with 2-20M more a third is 2.33 bars, to pass the inflection: 2-20M do no longer.

    Shorter bars close the gap over the column of the existing beam, but that check would fail.
    """
    asked = note_beam(cures=True)
    words = f"further bars 2-20M from 3.15 to 11.25 {AXIS}"
    for part in ("coverage-top", "coverage-top-tension", "coverage-gap-2"):
        assert words in cure(asked, part)
    given = inputs_of(EXISTING_BEAM)["bar_runs"]
    with_it = note_beam(bar_runs=[*given, row("top", "2-20M", 3.15, 11.25)])
    assert failing_of(with_it.parts) < failing_of(asked.parts)
    assert not [part.key for part in with_it.parts if part.key.startswith("coverage-gap")]
    assert not [p.key for p in with_it.parts if p.key.startswith("coverage") and failing(p)]
    short = failing_of(note_beam(bar_runs=[*given, row("top", "2-20M", 5.2, 9.2)]).parts)
    assert ("anchorage-top-2-left-inflection", "top-past-inflection") in short
    assert short - failing_of(asked.parts)


def note_beam(*, cures: bool = False, **changes: Any) -> Sheet:
    """The existing beam of the notebook, with other inputs."""
    beam = start(**(inputs_of(EXISTING_BEAM) | changes))
    return run(beam if cures else without_cures(beam))


def test_every_check_that_is_solved_apart_gets_its_cure() -> None:
    """Gaps, bars cut in tension, deflections: which place a check stands for is in its part's key.

    A part called otherwise would be told a cure of its section alone, or none.
    """
    rows = [
        row("bottom", "4-25M", -0.15, 17.5), row("bottom", "2-25M", 19.5, 24.55),
        row("top", "2-25M", -0.15, 24.55), row("top", "2-25M", 6.9, 24.55),
    ]  # fmt: skip
    stirrups = [{"span": k, "spacing": "250 mm"} for k in (1, 2, 3)]
    sheet = run(start(bar_runs=rows, stirrups=stirrups, live_load="6 kPa", h="450 mm"))
    marks = {
        "cut-low-shear": "that end here made", "cut-extension": "that end here made",
        "deflection-whole": "Bars are needed where none count",
        "strength": "all loads, dead load too|[Nn]o smaller loads",
        "bars-tension-side": "all loads, dead load too|[Nn]o smaller loads",
    }  # fmt: skip
    told: set[str] = set()
    for part in sheet.parts:
        kind = re.sub(r"\d+", "n", part.key)
        for check in failing(part):
            if kind.startswith(("coverage", "deflection", "anchorage-top-n-left-cut")):
                assert re.search(marks[check.symbol], cure(sheet, part.key)), part.key
                told.add(kind)
    assert told == {
        "anchorage-top-n-left-cut-n", "anchorage-top-n-left-cut-n-shear", "deflection-n",
        "coverage-bottom", "coverage-top", "coverage-top-tension", "coverage-gap-n",
    }  # fmt: skip
