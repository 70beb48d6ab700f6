"""Bottom bars at narrow end supports: more straight bars where no hook of their size fits."""

from __future__ import annotations

from dataclasses import replace
from itertools import pairwise
from typing import Any

import pytest

from lineproof.beams.continuous.anchored_ends import least_anchored
from lineproof.beams.continuous.detailing_data import SectionBars
from lineproof.beams.continuous.detailing_top import end_hook
from lineproof.beams.continuous.layout import BarRun
from lineproof.record import recompute

from . import flow

WALLS: list[dict[str, Any]] = [
    {"spans": ["5.5 m"], "supports": ["wall 250 mm"] * 2},
    {"spans": ["3.6 m"] * 3, "supports": ["wall 200 mm"] * 4, "h": "400 mm", "b_w": "300 mm"},
    {"spans": ["6 m"], "supports": ["wall 250 mm"] * 2,
     "project": {"codes": {"pair": "NBC 2025 + A23.3:24"}}},
    # Its top bars run through to the outer wall, where no hook fits and no moment stands.
    {"spans": ["3.4 m", "4.9 m"], "supports": ["wall 250 mm"] * 3, "h": "380 mm", "b_w": "350 mm",
     "spacing": "4.7 m", "superimposed": "1.0 kPa"},
]  # fmt: skip


@pytest.mark.parametrize("inputs", WALLS, ids=lambda inputs: "-".join(inputs["spans"]))
def test_beams_on_masonry_walls_are_designed(inputs: dict[str, Any]) -> None:
    """Walls of 200 and 250 mm: every check of strength and anchorage holds by the choice made."""
    record = flow.run(flow.start(**inputs)).close()

    assert [key for key in record.failed if not key.startswith("deflection")] == []
    assert record.entries["anchorage-end-1-bottom/bars-end-support"]["holds"]
    assert recompute(record) == []


def test_area_of_straight_bars_by_hand() -> None:
    """A wall 250 mm wide, bars that end 50 mm before its outer face: l_av = 200 mm.

    A hook of a 15M bar needs 0.8 x 100 x 16/sqrt(32) = 226 mm with its ties: it does not fit.
    Straight, by the table of 12.2.3 (factor 0.8 of thin bars, the others 1), l_d =
    0.45 x 0.8 x 400/sqrt(32) x 16 = 407 mm. The part 200/407 = 0.491 counts: 2-15M hold 196.4 mm2,
    3-15M 294.6 mm2: 197 mm2 ask for three bars, 600 mm2, and 295 mm2 for four.
    """
    design = flow.analysed(spans=["5.5 m"], supports=["wall 250 mm"] * 2).design
    bare = replace(design.designed, bars=SectionBars((), (), "15M"))

    areas = [least_anchored(bare, 1, "15M", needed) for needed in (196.0, 197.0, 294.0, 295.0)]

    assert areas == [400.0, 600.0, 600.0, 800.0]


@pytest.mark.parametrize(("restrained", "hook"), [(frozenset({2}), "90"), (frozenset(), "")])
def test_only_an_end_that_is_free_to_rotate_goes_without_a_hook(
    restrained: frozenset[int], hook: str
) -> None:
    """On 250 mm a hook of 226 mm does not fit; where a restraint is assumed it stands still."""
    design = flow.analysed(spans=["5.5 m"], supports=["wall 250 mm"] * 2).design
    end = replace(design.designed, restrained=restrained)
    run = BarRun("top", 1, 2, "15M", 0.0, 5450.0)

    assert end_hook(end, 2, run) == hook


def test_more_is_never_less() -> None:
    design = flow.analysed(spans=["5.5 m"], supports=["wall 250 mm"] * 2).design
    bare = replace(design.designed, bars=SectionBars((), (), "15M"))

    areas = [least_anchored(bare, 1, "20M", 50.0 * n) for n in range(1, 12)]

    assert all(a <= b for a, b in pairwise(areas))
    assert areas[0] < areas[-1]


def test_no_number_of_bars_holds_everything() -> None:
    design = flow.analysed(spans=["5.5 m"], supports=["wall 250 mm"] * 2).design
    bare = replace(design.designed, bars=SectionBars((), (), "15M"))

    assert least_anchored(bare, 1, "15M", 1e5) == float("inf")
