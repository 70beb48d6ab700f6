"""Recorded: one station of the bars as detailed, its moment or its tension against them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from lineproof.beams.continuous.anchorage import bar_of
from lineproof.beams.continuous.anchorage_record import Lengths, Writers, plain
from lineproof.beams.continuous.cutoff import half_of
from lineproof.beams.continuous.cutoff_ends import at_section, top_section
from lineproof.beams.continuous.cutoff_sets import (
    Group,
    begin,
    grouped,
    record_developed,
    record_resistance,
)
from lineproof.beams.continuous.cutoff_support import Hooks, hook_key, record_section
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.forces import ENDS, Demand, End
from lineproof.beams.continuous.resistance import Standing, top_layers
from lineproof.beams.continuous.resistance_cover import ROUND_OFF, Gap, Station
from lineproof.beams.continuous.resistance_demand import demand_at, largest_at, stretch_at
from lineproof.beams.continuous.resistance_ratio import ratio_of
from lineproof.beams.flexure import required
from lineproof.beams.steps import Steps
from lineproof.formula import Criterion
from lineproof.quantity.digits import fixed
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import cutoff as clause
from lineproof.standards.a23_3 import flexure, shear_bars

_NONE_STAND = "No {face} bars stand from {start} to {end} m from the left axis of span {span}."
_ENDS_MEET = (
    "At {start} m from the left axis of span {span} {face} bars end and others begin: none is "
    "developed there."
)


@dataclass(frozen=True, eq=False, slots=True)
class Laid:
    """The bars as laid with what is recorded of them: development lengths, hooks; their gaps."""

    writers: Writers
    lengths: Lengths
    hooked: Hooks
    standing: Sequence[Standing]
    gaps: Sequence[Gap] = ()

    def check(
        self, steps: Steps, test: Criterion, station: Station, *, tension: bool = False
    ) -> None:
        """Record a check of a station; one that fails is called by the gap that it stands for."""
        pair = (station.F, station.F_r) if tension else (station.M_f, station.M_r)
        fails = ratio_of(*pair) > 1 + ROUND_OFF
        gap = next((gap for gap in self.gaps if fails and gap.holds(station)), None)
        steps.check(
            test, title="" if gap is None else gap.title, leads=gap is not None and gap.bare
        )

    def none_stand(self, station: Station) -> str:
        """Say between which ends of bars no bars of its face stand at a station."""
        own = [bars.run for bars in self.standing if bars.run.face == station.face]
        low, high = self.writers.designed.outline.ends
        start = max((run.end for run in own if run.end <= station.x), default=low)
        end = min((run.start for run in own if run.start >= station.x), default=high)
        left = station.x - station.local
        text = _ENDS_MEET if start == end else _NONE_STAND
        return text.format(
            face=station.face,
            span=station.span,
            start=fixed((start - left) / 1e3, 2),
            end=fixed((end - left) / 1e3, 2),
        )


def _near(writers: Writers, station: Station) -> tuple[End, float]:
    """Return the support that a station is seen from and its distance from that axis.

    It is the nearer one, of a cantilever the one that holds it.
    """
    length = writers.designed.outline.lengths[station.span - 1]
    near = _end(writers.designed, station, length / 2)
    return near, station.local if near == "left" else length - station.local


def _end(designed: Designed, station: Station, middle: float) -> End:
    """Return the end of its span that a station belongs to, parted at ``middle`` [mm]."""
    supports = designed.outline.supports[station.span - 1 : station.span + 1]
    if designed.cantilever(station.span):
        return "right" if supports[0].kind == "free" else "left"
    return "left" if station.local <= middle else "right"


def record_moment(laid: Laid, station: Station, key: str, title: str) -> None:
    """Record the moment of a station against the bars there, in a part; a failing check if none."""
    writers, face = laid.writers, station.face
    sheet = writers.sheet
    near, t = _near(writers, station)
    bare = station.M_r <= 0
    with sheet.part(key, title):
        if bare:
            sheet.note("no-bars", laid.none_stand(station), title="Gap")
            steps = begin(writers, sheet, station.span, face)
        else:
            steps = _developed(laid, station, depth=True)
            record_resistance(steps, writers, face)
        x = _record_place(writers, station, near, t)
        writers.forces(steps, _demand(writers, station, tension=False), near, x)
        if bare:
            steps.bind(M_r=sheet.given("M_r", "0 kN.m", source="no bars"))
        laid.check(steps, flexure.STRENGTH, station)


def _record_place(writers: Writers, station: Station, near: End, t: float) -> Entry:
    """Record the place of the forces of a station: inside a support, that of its face."""
    half = half_of(writers.designed, station.span, near)
    if t >= half:
        return writers.sheet.given("x_st", plain(t, "mm"), source="worst of all stations")
    writers.sheet.note(
        "inside",
        f"The station lies inside the support, {t:g} mm from its axis: there the moment of the "
        "face counts.",
        title="Place",
    )
    return writers.sheet.given("x_st", plain(half, "mm"), source="face of the support")


def _demand(writers: Writers, station: Station, *, tension: bool) -> Demand:
    """Return the forces of the case that governs at a station; the shear of its worse side."""
    forces = writers.designed.forces
    now = demand_at(writers.designed, station.span, np.array([station.local]))
    side = now.side(station.face)
    row = int((side.F_row if tension else side.M_row)[0])
    start, end = forces.beam.faces(station.span)
    x = min(max(station.local, start), end)
    both = [forces.demand(station.span, x, s, row) for s in ENDS]
    return max(both, key=lambda d: abs(d.V))


def _developed(laid: Laid, station: Station, *, depth: bool = False) -> Steps:
    """Record inside the open part the bars of a station, counted as far as they are developed.

    Their depth as well where it is asked for.
    """
    writers = laid.writers
    steps = begin(writers, writers.sheet, station.span, station.face)
    rows: dict[tuple[Group, float, str], tuple[Group, float, Entry]] = {}
    for bars in laid.standing:
        if bars.run.face != station.face:
            continue
        part = float(bars.developed(np.array([station.x]))[0])
        if part <= 0:
            continue
        l_av, needed = _available(laid, bars, station.x)
        (group,) = grouped(writers, (bars.run,))
        whole = part >= 1
        key = (
            Group(group.layer, group.size, 0, group.first),
            0.0 if whole else l_av,
            "" if whole else needed.id,
        )
        before = rows.get(key)
        number = group.number + (before[0].number if before else 0)
        if before and before[1] / before[2].value < l_av / needed.value:
            l_av, needed = before[1], before[2]
        rows[key] = (Group(group.layer, group.size, number, group.first), l_av, needed)
    if not rows:
        none = writers.sheet.given("A_sd", "0 mm2", source="no bars count here")
        steps.bind(A_sd=none, A_s=none)
        return steps
    record_developed(steps, rows.values(), depth=depth)
    return steps


def _available(laid: Laid, bars: Standing, x: float) -> tuple[float, Entry]:
    """Return the length to the end that governs, and the recorded length needed there."""
    writers = laid.writers
    recorded = laid.lengths[bar_of(writers.designed, bars.run)]
    last = len(writers.designed.outline.supports)
    ends = (
        (x - bars.run.start, bars.rise_start, bars.run.hook_start, bars.lap_start, 1),
        (bars.run.end - x, bars.rise_end, bars.run.hook_end, bars.lap_end, last),
    )
    length, rise, hook, lap, support = min(ends, key=lambda end: end[0] / end[1])
    if hook:
        return length, laid.hooked[hook_key(support, bars.run)]
    if lap and length < rise and rise > recorded["l_s"].value:
        return length, _overlap(writers.sheet, rise)
    short = lap and length < recorded["l_s"].value  # else developed in full by either length
    return length, recorded["l_s" if short else "l_d"]


def _overlap(sheet: Sheet, length: float) -> Entry:
    """Return the overlap of lapped bars that is longer than the lap, recorded once in a part."""
    known = [e for k, e in sheet.part_entries.items() if k.startswith("l_lp")]
    for entry in known:
        if entry.value == length:
            return entry
    name = f"l_lp{len(known) or ''}"
    return sheet.given(name, plain(length, "mm"), "overlap of the lapped bars", source="as laid")


def record_tension(laid: Laid, station: Station, key: str, title: str) -> None:
    """Record the tension of a station, moment and shear, against the bars there, in a part."""
    writers, face = laid.writers, station.face
    designed, sheet = writers.designed, writers.sheet
    near, t = _near(writers, station)
    end = _end(designed, station, sum(designed.forces.beam.faces(station.span)) / 2)
    section = _section(laid, station, end, key)
    side = demand_at(designed, station.span, np.array([station.local])).side(face)
    inside = t < half_of(designed, station.span, near)
    capped = inside or float(side.free[0]) > float(side.cap[0])
    cap = _record_cap(laid, station, end, key, section["d"]) if capped else None
    with sheet.part(key, title):
        steps = _developed(laid, station)
        x = _record_place(writers, station, near, t)
        demand = _demand(writers, station, tension=True)
        writers.forces(steps, demand, near, x)
        _record_shear(writers, steps, station.x - station.local + demand.x)
        helps = demand.M > 0 if face == "bottom" else demand.M < 0
        steps.bind(d_v=section["d_v"])
        steps.line(shear_bars.TENSION_SIDE if helps else clause.TENSION_OTHER_SIDE)
        if cap is None:
            laid.check(steps, shear_bars.TENSION_SIDE_HOLDS, station, tension=True)
            return
        steps.bind(A_sr=cap)
        steps.line(shear_bars.TENSION_SIDE_CAPPED)
        laid.check(steps, shear_bars.CAPPED_HOLDS, station, tension=True)


def record_turned(laid: Laid, station: Station, key: str, title: str) -> None:
    """Record the tension with torsion of a section of shear against the bars there, in a part.

    The force is that of the section, which is recorded with its working where it is not yet.
    """
    writers, face = laid.writers, station.face
    column, section = station.column, writers.section
    assert column is not None  # asked for before  # noqa: S101
    assert section is not None  # noqa: S101 - no torsion is known without a chapter on shear
    force = section(station.span, station.row, column, f"{key}-shear")
    _, t = _near(writers, station)
    M_f = writers.designed.forces.demand(station.span, station.local, "left", station.row).M
    with writers.sheet.part(key, title):
        text = f"The section of shear {t:g} mm from the near support axis, {station.case}."
        writers.sheet.note("place", text, title="Station")
        steps = _developed(laid, station)
        steps.bind(**{n: force[n] for n in ("F_lt", "F_lc") if n in force})
        if (M_f >= 0) == (face == "bottom"):
            laid.check(steps, shear_bars.TENSION_SIDE_HOLDS, station, tension=True)
            return
        steps.bind(A_sp=steps.entry("A_sd"))
        laid.check(steps, shear_bars.COMPRESSION_SIDE_HOLDS, station, tension=True)


def _record_shear(writers: Writers, steps: Steps, x: float) -> None:
    """Record what the stirrups do at a place along the beam, inside a support at its face."""
    stretch = stretch_at(writers.designed, x)
    if writers.designed.shear:
        writers.shear(steps, stretch, ("V_s", "theta"))
        return
    steps.bind(
        V_s=writers.sheet.given("V_s", "0 kN", source="no stirrups counted"),
        theta=writers.sheet.given("theta", plain(stretch.theta, "deg"), source="11.3.6.3"),
    )


def _section(laid: Laid, station: Station, end: End, key: str) -> dict[str, Entry]:
    """Return the recorded section that a station belongs to; record it where there is none."""
    writers, span = laid.writers, station.span
    sheet = writers.sheet
    support = span if end == "left" else span + 1
    known = f"anchorage-bottom-{span}"
    if station.face == "top":
        known = f"anchorage-top-{support}-{'right' if end == 'left' else 'left'}"
    if any(part.key == known for part in sheet.parts):
        return sheet.entries_of(known)
    title = f"Top bars at support {support}"
    with sheet.part(f"{key.removesuffix('-tension')}-section", title):
        place = top_section(writers.designed.outline, support)
        there = at_section((bars.run for bars in laid.standing), "top", place)
        stated = title if there else f"{title}: none; for the depth alone, in the corners"
        record_section(writers, top_layers(writers.designed, support), span, "top", stated)
    return sheet.entries_of(f"{key.removesuffix('-tension')}-section")


def _record_cap(laid: Laid, station: Station, end: End, key: str, d: Entry) -> Entry:
    """Record the steel that the largest moment of the face needs alone, at d; return A_sr."""
    writers, face = laid.writers, station.face
    sheet, designed = writers.sheet, writers.designed
    demand = largest_at(designed, face, station.span, end)
    length = designed.outline.lengths[station.span - 1]
    near: End = "left" if demand.x <= length / 2 else "right"
    t = float(round(demand.x if near == "left" else length - demand.x))  # flat there: 1 mm is near
    at = t if near == "left" else length - t
    demand = designed.forces.demand(station.span, at, demand.side, demand.row)
    title = f"{face.capitalize()} bars: what the largest moment of span {station.span} needs alone"
    with sheet.part(f"{key.removesuffix('-tension')}-largest", title):
        steps = begin(writers, sheet, station.span, face)
        steps.bind(d=d)
        x = sheet.given("x_st", plain(t, "mm"), source="place of the largest moment")
        writers.forces(steps, demand, near, x)
        flanged = face == "bottom" and designed.outline.h_f > 0
        required(steps, designed.outline.shape if flanged else "rectangular")
        return steps.entry("A_sr")
