"""A walk along a beam that finds what its bars do not cover, by formulas of its own."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np
from numpy.typing import NDArray

from lineproof.beams.continuous.beam import ContinuousBeam
from lineproof.beams.continuous.layout import BarRun
from lineproof.record import Record

Floats = NDArray[np.float64]
AREAS = {"10M": 100.0, "15M": 200.0, "20M": 300.0, "25M": 500.0, "30M": 700.0, "35M": 1000.0}
DIAMETERS = {"10M": 11.3, "15M": 16.0, "20M": 19.5, "25M": 25.2, "30M": 29.9, "35M": 35.7}
"""CSA G30.18, mm2 and mm."""
PHI_C, PHI_S = 0.65, 0.85
STATIONS = 1000
TIP = 100.0
"""Length at a free end [mm], cover and the ends of the bars, in which the moment is nothing."""


@dataclass(frozen=True)
class Walk:
    """What the walk takes from a record and a design."""

    beam: ContinuousBeam
    record: Record

    def value(self, entry_id: str) -> float:
        """Return a recorded value [N, mm]."""
        return float(self.beam.sheet.entry(entry_id).value)

    @cached_property
    def runs(self) -> tuple[BarRun, ...]:
        """The bars along the beam, without those of the side faces."""
        return tuple(r for r in self.beam.design.runs if r.place != "side face")

    @cached_property
    def developed(self) -> list[tuple[str, float]]:
        """The recorded development lengths with the titles of their parts."""
        return [
            (part["title"], self.value(f"{part['key']}/l_d"))
            for part in self.record.data["parts"]
            if part["title"].startswith("Development of ")
        ]

    def length(self, run: BarRun) -> float:
        """Return the recorded development length of a run's bars: the longest of its kind."""
        where = "in the overhang" if run.place == "overhang" else "in a layer"
        head = f"Development of {run.face} bars {run.size}, "
        return max(
            length
            for title, length in self.developed
            if title.startswith(head) and title.endswith(where)
        )

    def hook(self, run: BarRun, end: str) -> float:
        """Return the recorded development length of a hook."""
        last = len(self.beam.inputs.supports)
        key = f"anchorage-end-{1 if end == 'start' else last}-hook-{run.size.lower()}"
        key += "-overhang" if run.place == "overhang" else ""
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
    runs = walk.runs
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
