"""A short span between long ones: no moment with the bottom in tension, top bars that run through.

A corridor between two rooms is the common case: 8, 3 and 8 m.
"""

from __future__ import annotations

from collections.abc import Sequence
from functools import cache

import pytest

from lineproof.audit.search.missing import missing_checks
from lineproof.beams.analysis.arrangements import Combination
from lineproof.beams.analysis.model import Beam, Span, Support, UniformLoad
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.detailing_meeting import others_through
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.layout import BarRun
from lineproof.record import Record, recompute

from . import flow

SUPPORTS = ("girder 400 mm", "column 450 mm", "column 450 mm", "girder 400 mm")
SHORT = (["8 m", "3 m", "8 m"], ["9 m", "2.5 m", "9 m"], ["7.6 m", "2.8 m", "9.2 m"])


def beam_of(*lengths: float) -> Beam:
    """A beam on simple supports 400 mm wide."""
    supports = tuple(Support("simple", 400.0) for _ in range(len(lengths) + 1))
    return Beam(tuple(Span.of(length, 26e3, 5e9) for length in lengths), supports)


def test_largest_moment_of_a_span_that_hogs_all_along() -> None:
    """By hand: 8, 3, 8 m under 10 kN/m; three-moment equation M (2 (8 + 3) + 3) = -w (8^3 + 3^3)/4.

    M = -10*539/100 = -53.9 kN.m at both axes; at midspan -53.9 + 10*3^2/8 = -42.65 kN.m.
    """
    loads = [UniformLoad("D", span, 10.0) for span in (1, 2, 3)]
    own = [Combination("1.0D", "", (("D", 1.0),))]
    forces = Forces.of(beam_of(8000.0, 3000.0, 8000.0), loads, own)

    found = forces.sag(2)

    assert found.x == pytest.approx(1500.0, abs=1e-6)
    assert pytest.approx(-42.65e6, rel=1e-9) == found.M


@cache
def made(*spans: str) -> tuple[Design, Record]:
    """The design and the record of a beam of these spans."""
    beam = flow.start(spans=list(spans), supports=list(SUPPORTS))
    record = flow.run(beam).close()
    return beam.design, record


@pytest.mark.parametrize("spans", SHORT)
def test_a_short_span_is_designed_like_any_other(spans: Sequence[str]) -> None:
    """No check of strength fails by the choice of its bars, none is missing, all recomputes."""
    _, record = made(*spans)

    assert [i for i in record.failed if not i.startswith("deflection-")] == []
    assert missing_checks(record) == ()
    assert recompute(record) == []


def test_no_bottom_bars_are_checked_against_a_moment_of_the_top() -> None:
    """Span 2 of 8, 3, 8 m hogs under every load: its bars have a resistance and no demand."""
    _, record = made(*SHORT[0])
    part = next(part for part in record.parts if part["key"] == "sag-2")
    symbols = [entry["symbol"] for entry in part["entries"]]
    rows = next(e for e in record.entries.values() if e["title"] == "Flexure: what governs")["rows"]

    assert "no-moment" in symbols
    assert "M_r" in symbols
    assert not {"strength", "A_sr", "minimum-steel", "waiver", "crack-control"} & set(symbols)
    assert [row[1] for row in rows if row[0] == "span 2"] == ["no tension at the bottom"]


@pytest.mark.parametrize("spans", SHORT)
@pytest.mark.parametrize("place", ["web", "overhang"])
def test_no_more_top_bars_side_by_side_than_over_a_support(
    spans: Sequence[str], place: str
) -> None:
    """Bars of both supports that would pass each other in the short span are one bar.

    Two more stand within the web where the corner bars are lapped.
    """
    design, _ = made(*spans)
    start, end = design.outline.axes[1:3]
    runs = [r for r in design.runs if (r.face, r.place, r.layer) == ("top", place, 1)]
    supports = design.designed.bars.top[1:3]
    most = max(top.web[0].number + 2 if place == "web" else top.overhang for top in supports)

    for step in range(101):
        x = start + (end - start) * step / 100
        assert sum(r.number for r in runs if r.start < x < r.end) <= most


@pytest.fixture
def designed() -> Designed:
    """Any beam: the bars above are laid by hand."""
    return made(*SHORT[0])[0].designed


def run(support: int, number: int, start: float, end: float) -> BarRun:
    """Bars within the web over a support."""
    return BarRun("top", 1, number, "20M", start, end, serves=f"support {support}")


def test_bars_of_two_supports_that_meet(designed: Designed) -> None:
    """Five bars and three that pass each other: three run through, two keep their ends."""
    corners = run(2, 2, 5000.0, 9000.0)
    rows = {
        2: [corners, run(2, 5, 6000.0, 10500.0)],
        3: [corners, run(3, 3, 9500.0, 13000.0)],
        4: [corners, run(4, 3, 16000.0, 19000.0)],
    }

    found = [(r.number, r.start, r.end, r.serves) for r in others_through(designed, rows)]

    assert sorted(found) == [
        (2, 6000.0, 10500.0, "support 2"),
        (3, 6000.0, 13000.0, "support 2, support 3"),
        (3, 16000.0, 19000.0, "support 4"),
    ]


def test_bars_past_a_support_are_for_the_span_behind() -> None:
    """Top bars of the support behind end in a cantilever: what they need counts from that span.

    By hand, spans 1.6 m (free end), 4 and 9.9 m, dead load 22.0152 kN/m, live load 14.88 kN/m on
    spans 1 and 3 (three-moment equation, M_2 of statics, the other end free to turn):
    M_2D = -22.0152*1.6**2/2 = -28.18, M_2L = -14.88*1.6**2/2 = -19.05 kN.m,
    M_3D = (4*28.18 - 22.0152*(4**3 + 9.9**3)/4)/27.8 = -200.71, M_3L1 = 4*19.05/27.8 = 2.74,
    M_3L3 = -14.88*9.9**3/4/27.8 = -129.84. Factored: M_2 = -63.79, M_3 = -441.54 kN.m,
    V = 27.52*4/2 - (441.54 - 63.79)/4 = -39.40 kN in span 2.
    4-15M go on: a = 0.85*800*400/(0.802*0.65*32*380) = 42.91, d = 800 - 30 - 11.3 - 8 = 750.7 mm,
    M_r = 272 kN*(750.7 - 21.5) = 198.4 kN.m. 63.79 + 39.40 x + 13.76 x**2 = 198.4 at x = 2.008 m.
    """
    spans = ["1.6 m", "4 m", "9.9 m"]
    supports = ["free", "column 400 mm", "column 400 mm", "column 400 mm"]
    record = flow.run(flow.start(spans=spans, supports=supports, h="800 mm")).close()
    part = "anchorage-top-2-left-cut-1"
    values = {key: record.entries[f"{part}/{key}"]["value"] for key in ("x_t", "M_f", "M_r")}
    assert values["x_t"] in (2007.0, 2008.0)
    assert values["M_r"] == pytest.approx(198.4, rel=1e-3)
    assert values["M_f"] == pytest.approx(198.4, rel=1e-3)
    # They end 500 mm past the axis of support 2, so 2507 mm or more past the point.
    x_e = record.entries[f"{part}/x_e"]["value"]
    assert x_e == 500.0
    assert record.entries[f"{part}/l_ext"]["value"] in (2507.0, 2508.0)
    assert record.failed == []
    assert recompute(record) == []
