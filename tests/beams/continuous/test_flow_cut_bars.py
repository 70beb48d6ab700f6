"""The bars as cut, walked by hand: M_f <= M_r at 1,000 stations a span, anchorage counted.

The walk has its own formulas. It takes from the record what is typed in and the development and
hook lengths as recorded; from the design the runs of bars; from the analysis, which has tests of
its own, the moments of every load case.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np
import pytest
from numpy.typing import NDArray

from lineproof.beams.continuous.beam import ContinuousBeam
from lineproof.beams.continuous.layout import BarRun
from lineproof.record import Record

from .flow import MIXED, run, start

Floats = NDArray[np.float64]
AREAS = {"10M": 100.0, "15M": 200.0, "20M": 300.0, "25M": 500.0, "30M": 700.0, "35M": 1000.0}
DIAMETERS = {"10M": 11.3, "15M": 16.0, "20M": 19.5, "25M": 25.2, "30M": 29.9, "35M": 35.7}
"""CSA G30.18, mm2 and mm."""
PHI_C, PHI_S = 0.65, 0.85
STATIONS = 1000
TIP = 100.0
"""Length at a free end [mm], cover and the ends of the bars, in which the moment is nothing."""
BEAMS: Mapping[str, Mapping[str, Any]] = {
    "three spans": {},
    "mixed": MIXED,
    "storage, simplified": {"use": "library stack room", "shear_method": "simplified"},
    "rectangular, 500R": {
        "shape": "rectangular", "h_f": None, "floor_weight": "3.4 kPa", "grade": "500R",
    },
    "torsion": {
        "shape": "L", "tributary_width": "1.7 m", "closed_stirrups": True,
        "torques": {"D": "1.4 kN.m", "L": "0.9 kN.m"},
    },
    "two spans of unlike length": {
        "spans": ["8 m", "6.5 m"], "supports": ["wall 300 mm", "column 450 mm", "wall 300 mm"],
        "f_c": "40 MPa",
    },
    "four spans": {
        "spans": ["6 m", "7 m", "7 m", "6 m"], "cover": "40 mm",
        "supports": ["girder 400 mm", *["column 450 mm"] * 3, "girder 400 mm"],
        "loads": [{"type": "L", "span": 2, "point": "60 kN", "at": "2.4 m"}],
    },
}  # fmt: skip


@dataclass(frozen=True)
class Walk:
    """What the walk takes from a record and a design."""

    beam: ContinuousBeam
    record: Record

    def value(self, entry_id: str) -> float:
        """Return a recorded value [N, mm]."""
        return float(self.beam.sheet.entry(entry_id).value)

    def length(self, run: BarRun) -> float:
        """Return the recorded development length of a run's bars: the longest of its kind."""
        where = "in the overhang" if run.place == "overhang" else "in a layer"
        found = [
            self.value(f"{part['key']}/l_d")
            for part in self.record.data["parts"]
            if part["title"].startswith(f"Development of {run.face} bars {run.size}, ")
            and part["title"].endswith(where)
        ]
        return max(found)

    def hook(self, run: BarRun, end: str) -> float:
        """Return the recorded development length of a hook."""
        last = len(self.beam.inputs.supports)
        key = f"anchorage-end-{1 if end == 'start' else last}-hook-{run.size.lower()}"
        return self.value(f"{key}/l_dh")

    def distance(self, run: BarRun, runs: tuple[BarRun, ...], x: float) -> float:
        """Return how far the centres of a run's bars stand from the face of the beam."""
        first = self.value("given/c_c") + DIAMETERS[self.beam.inputs.stirrup]
        d_b = DIAMETERS[run.size]
        if run.layer == 1:
            return first + d_b / 2
        below = max(
            DIAMETERS[r.size]
            for r in runs
            if (r.face, r.layer) == (run.face, 1) and r.place == "web" and r.start <= x <= r.end
        )
        clear = max(1.4 * max(below, d_b), 1.4 * self.value("given/a_max"), 30.0)
        return first + below + clear + d_b / 2


def part_of(walk: Walk, run: BarRun, x: float) -> float:
    """Return the part of the yield strength that bars reach: in proportion to the length left."""
    ends = [
        (x - run.start) / (walk.hook(run, "start") if run.hook_start else walk.length(run)),
        (run.end - x) / (walk.hook(run, "end") if run.hook_end else walk.length(run)),
    ]
    return float(np.clip(min(ends), 0.0, 1.0))


def in_lap(one: BarRun, other: BarRun, length: float) -> bool:
    """Tell whether like bars in line are lapped; longer side by side they are two sets."""
    same = (one.face, one.layer, one.place, one.size, one.number) == (
        other.face, other.layer, other.place, other.size, other.number,
    )  # fmt: skip
    return (
        same
        and one.start < other.start < one.end < other.end
        and (one.end - other.start <= 2 * length)
    )


def standing(walk: Walk, face: str, x: float) -> tuple[float, float]:
    """Return the area that counts at a place, and the distance of its centre from the face."""
    runs = tuple(r for r in walk.beam.design.runs if r.place != "side face")
    here = [r for r in runs if r.face == face and r.start <= x <= r.end]
    counted: dict[BarRun, float] = {}
    for bars in here:
        share = part_of(walk, bars, x)
        mate = next((m for m in counted if in_lap(m, bars, walk.length(bars))
                     or in_lap(bars, m, walk.length(bars))), None)  # fmt: skip
        # Two bars lapped count as one: together they reach yield once, not twice.
        counted[bars] = share if mate is None else max(min(share, 1.0 - counted[mate]), 0.0)
    area = sum(r.number * AREAS[r.size] * share for r, share in counted.items())
    if area == 0:
        return 0.0, 0.0
    lever = sum(
        r.number * AREAS[r.size] * share * walk.distance(r, runs, x) for r, share in counted.items()
    )
    return area, lever / area


def resistance(walk: Walk, span: int, face: str, x: float) -> float:
    """Return M_r [N.mm]: a T below the span, the web alone over the supports."""
    area, away = standing(walk, face, x)
    f_c, f_y = walk.value("given/f_c"), walk.value("materials/f_y")
    b_w, inputs = walk.value("given/b_w"), walk.beam.inputs
    d = inputs.depths[span - 1].value - away
    stress = (0.85 - 0.0015 * f_c) * PHI_C * f_c
    force = PHI_S * f_y * area
    if face == "bottom" and inputs.h_f is not None:
        b_f, h_f = walk.value(f"span-{span}/b_f"), inputs.h_f.value
        if force > stress * b_f * h_f:
            flange = stress * (b_f - b_w) * h_f
            web = force - flange
            return flange * (d - h_f / 2) + web * (d - web / (2 * stress * b_w))
        return force * (d - force / (2 * stress * b_f))
    return force * (d - force / (2 * stress * b_w))


def uncovered(walk: Walk, span: int) -> list[tuple[str, float, float, float]]:
    """Return face, place, M_f and M_r at the stations that bars do not cover in some load case."""
    beam, inputs = walk.beam, walk.beam.inputs
    forces = beam.model.forces
    left, right = forces.beam.faces(span)
    if inputs.supports[span - 1].kind == "free":
        left += TIP
    if inputs.supports[span].kind == "free":
        right -= TIP
    local: Floats = np.linspace(left, right, STATIONS)
    M, _ = forces.along(span, local)
    axis = sum(length.value for length in inputs.spans[: span - 1])
    found = []
    for n, x in enumerate((local + axis).tolist()):
        for face, M_f in (("bottom", float(M[:, n].max())), ("top", float(-M[:, n].min()))):
            if M_f > 1e3:  # below that, round-off of the analysis
                M_r = resistance(walk, span, face, x)
                if M_f > M_r * (1 + 1e-9):
                    found.append((face, x, M_f, M_r))
    return found


def walked(walk: Walk, span: int) -> list[str]:
    """Say at which stations of a span bars do not cover the moment of some load case."""
    return [
        f"span {span}, {face}, {x:.0f} mm: {M_f / 1e6:.2f} > {M_r / 1e6:.2f} kN.m"
        for face, x, M_f, M_r in uncovered(walk, span)
    ]


@pytest.fixture(scope="module", params=BEAMS, ids=list(BEAMS))
def walk(request: pytest.FixtureRequest) -> Walk:
    """A beam run through the whole flow."""
    beam = start(**BEAMS[request.param])
    return Walk(beam, run(beam).close())


def test_every_station_is_covered(walk: Walk) -> None:
    """1,000 stations a span, both faces, every load case."""
    found = [text for k in range(1, len(walk.beam.inputs.spans) + 1) for text in walked(walk, k)]
    assert found == []
    assert [key for key in walk.record.failed if key.startswith("coverage")] == []


def test_a_bar_cut_shorter_is_found() -> None:
    """The walk is not blind: half of the bars stop before midspan; walk and record fail alike."""
    rows = [
        {"face": "bottom", "bars": "2-25M", "start": "-0.15 m", "end": "24.55 m"},
        {"face": "bottom", "bars": "2-25M", "start": "-0.15 m", "end": "12.0 m"},
        {"face": "bottom", "bars": "2-25M", "start": "16.0 m", "end": "24.55 m"},
        {"face": "top", "bars": "5-25M", "start": "-0.15 m", "end": "24.55 m"},
    ]
    beam = start(bar_runs=rows)
    found = Walk(beam, run(beam).close())
    told = walked(found, 2)
    assert told
    assert all(text.startswith("span 2, bottom, 1") for text in told)
    assert "coverage-bottom/strength" in found.record.failed
    notes = [e for e in found.record.entries.values() if e["id"].startswith("coverage/gap")]
    assert {note["title"] for note in notes} == {"NOT covered"}
    assert any(note["text"].startswith("Not enough bottom bars, span 2, ") for note in notes)


def test_a_stretch_without_any_bars_is_printed_and_fails() -> None:
    """From 13.6 to 14.0 m nothing stands below: no resistance there, by the walk and the record."""
    rows = [
        {"face": "bottom", "bars": "4-25M", "start": "-0.15 m", "end": "13.6 m"},
        {"face": "bottom", "bars": "4-25M", "start": "14.0 m", "end": "24.55 m"},
        {"face": "top", "bars": "5-25M", "start": "-0.15 m", "end": "24.55 m"},
    ]
    beam = start(bar_runs=rows)
    found = Walk(beam, run(beam).close())
    assert walked(found, 2)
    assert {"coverage-bottom/strength", "shear-2-along/strain-bars"} <= set(found.record.failed)
    assert found.record.entries["coverage-bottom/M_r"]["value"] == 0
