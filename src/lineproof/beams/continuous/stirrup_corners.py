"""Whether a bar stands in each corner of the stirrups, all along the beam (12.13.2)."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from lineproof.beams.continuous.layout import BarRun, BeamOutline, Face, StirrupZone, places_of
from lineproof.beams.continuous.resistance import depth_of
from lineproof.beams.steps import Steps
from lineproof.formula import FROM_MEMORY
from lineproof.standards.a23_3 import shear_bars

CORNERS = 2
"""Corners of a stirrup at a face, with a bar in each."""
_NEAR = 1.0
"""Bars that end no farther than this [mm] from a stirrup stand in it: ends are on whole mm."""
_INNER = (
    "Stirrups of {} legs have as many bends at each face, and 12.13.3 asks for a bar in each; "
    "where fewest stand there are {}. The drawings add bars, at least as thick as the stirrups, in "
    "the bends of inner stirrups that hold none."
)


@dataclass(frozen=True, slots=True)
class Fewest:
    """The fewest bars in the outer layer of a face where a stirrup stands, ``x`` along it [mm]."""

    number: int
    face: Face
    x: float


def fewest_in_corners(
    outline: BeamOutline, runs: Sequence[BarRun], zones: Sequence[StirrupZone]
) -> Fewest | None:
    """Return the stirrup that has fewest bars in the outer layer of a face; None without any.

    Bars in the overhangs and at the side faces stand in no corner, nor do bottom bars that reach in
    from a span of another depth.
    """
    found = [
        Fewest(sum(run.number for run in own if _stands(run, x)), face, x)
        for zone in zones
        for face, own in _outer(outline, runs, zone.span)
        for x in places_of(zone)
    ]
    return min(found, key=lambda each: each.number, default=None)


def _outer(
    outline: BeamOutline, runs: Sequence[BarRun], span: int
) -> Iterator[tuple[Face, list[BarRun]]]:
    """Give the bars of the outer layer of both faces that can stand in the corners of a span."""
    web = [run for run in runs if run.place == "web" and run.layer == 1]
    h = outline.depths[span - 1]
    yield "bottom", [r for r in web if r.face == "bottom" and depth_of(outline, r) == h]
    yield "top", [run for run in web if run.face == "top"]


def _stands(run: BarRun, x: float) -> bool:
    return run.start - _NEAR <= x <= run.end + _NEAR


def record_corners(steps: Steps, fewest: Fewest, legs: int) -> None:
    """Record inside the open part that a bar stands in each corner of the stirrups.

    Of inner stirrups it is said where their bends hold none.
    """
    sheet = steps.sheet
    place = f"as laid, {fewest.face}, {fewest.x / 1000:.2f} m from support 1"
    steps.check(shear_bars.CORNERS_HELD, n_cb=sheet.given("n_cb", str(fewest.number), source=place))
    if CORNERS <= fewest.number < legs:
        sheet.note(
            "inner-stirrups", _INNER.format(legs, fewest.number), title="Inner stirrups",
            clause="12.13.3", basis=FROM_MEMORY,
        )  # fmt: skip
