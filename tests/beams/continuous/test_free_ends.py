"""Free ends: bars and stirrups have the cover there as well, and stirrups stand around the bars.

By hand: a cantilever of 2.3 m on a girder of 400 mm has a clear length of 2300 - 200 = 2100 mm.
Stirrups 275 mm apart, the first and last at 75 mm: 2100 - 150 = 1950 mm hold 7 spaces, and 25 mm
are left, less than 10M stirrups need, 75 + 11.3, rounded up 90 mm. So both move outward by (90 -
25)/2 = 32.5 mm, to 42.5 mm: at the free end past the bars, which end 50 mm from it, and within the
cover. Half a stirrup, 11.3/2 = 5.65 mm, rounded up 10 mm, shall stand inside of the bars: all move
inward, the last one to 25 mm from the girder, by 42.5 - 25 = 17.5 mm.
"""

from __future__ import annotations

from collections.abc import Mapping
from itertools import pairwise
from typing import Any

import pytest

from lineproof import beams
from lineproof.beams.continuous.layout import places_of

from .flow import record_of, run, start

CANTILEVER: Mapping[str, Any] = {
    "spans": ["2.3 m", "7 m"],
    "supports": ["free", "girder 400 mm", "wall 400 mm"],
    "h": "510 mm",
    "stirrups": [{"span": 1, "spacing": "275 mm"}, {"span": 2, "spacing": "200 mm"}],
}


def _built(**changes: Any) -> beams.ContinuousBeam:
    beam = start(**(dict(CANTILEVER) | changes))
    run(beam)
    return beam


def _stirrups(beam: beams.ContinuousBeam, span: int) -> list[float]:
    zones = beam.design.detailing.stirrups
    return sorted(x for zone in zones if zone.span == span for x in places_of(zone))


def test_stirrups_stand_around_the_bars_at_a_free_end() -> None:
    """42.5 + 17.5 = 60 mm from the end, the last 25 mm from the girder at 2100 mm."""
    beam = _built()
    assert min(bars.start for bars in beam.design.runs) == pytest.approx(50)
    places = _stirrups(beam, 1)
    assert places[0] == pytest.approx(60)
    assert places[-1] == pytest.approx(2100 - 25)


def test_a_larger_cover_holds_at_the_ends_too() -> None:
    """Cover 60 mm: bars end 60 mm from the end; the first stirrup moves on alone to 70 mm.

    The second one stands at 60 + 275 = 335 mm, 265 mm beyond. At the wall bars end 60 mm from its
    far side.
    """
    beam = _built(cover="60 mm")
    assert min(bars.start for bars in beam.design.runs) == pytest.approx(60)
    assert max(bars.end for bars in beam.design.runs) == pytest.approx(9300 + 200 - 60)
    places = _stirrups(beam, 1)
    assert places[:2] == pytest.approx([70, 335])


def test_a_free_end_at_the_right_is_its_mirror_image() -> None:
    left = _stirrups(_built(cover="60 mm"), 1)
    turned = _built(
        cover="60 mm", spans=["7 m", "2.3 m"], supports=["wall 400 mm", "girder 400 mm", "free"],
        stirrups=[{"span": 1, "spacing": "200 mm"}, {"span": 2, "spacing": "275 mm"}],
    )  # fmt: skip
    right = [9300 - x for x in reversed(_stirrups(turned, 2))]
    assert [b - a for a, b in pairwise(right)][1:-1] == pytest.approx(
        [b - a for a, b in pairwise(left)][1:-1]
    )
    assert right[0] == pytest.approx(left[0])


@pytest.mark.parametrize(("past", "held"), [(170, True), (171, False)])
def test_given_bars_are_covered_at_their_ends(past: int, *, held: bool) -> None:
    """Girder of 400 mm: its outer face stands 200 mm from the axis; 30 mm are asked for, N.

    Stirrup of 10M and bars of 20M in concrete of 20 mm stone: max(30, 1 x 19.5, 1 x 20) = 30 mm.
    """
    bars = {"bars": "3-20M", "start": f"-{past} mm", "end": "7750 mm"}
    made = record_of(
        spans=["7.6 m"], supports=["girder 400 mm", "girder 400 mm"],
        bar_runs=[{"face": face, **bars} for face in ("bottom", "top")],
    )  # fmt: skip
    assert ("cover/cover-ends" not in made.failed) == held
    assert made.entries["cover/c_end"]["value"] == 200 - past
