"""Recorded: the bars as detailed against every load case, as a table and at the worst stations."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from lineproof.beams.continuous.anchorage import bar_of
from lineproof.beams.continuous.anchorage_record import Lengths, Writers, plain
from lineproof.beams.continuous.cutoff import half_of
from lineproof.beams.continuous.cutoff_ends import Runs
from lineproof.beams.continuous.cutoff_sets import (
    Group,
    begin,
    grouped,
    record_developed,
    record_resistance,
)
from lineproof.beams.continuous.cutoff_support import Hooks, record_section
from lineproof.beams.continuous.forces import Demand, End
from lineproof.beams.continuous.layout import Face
from lineproof.beams.continuous.resistance import (
    Standing,
    provide,
    stand,
    top_layers,
)
from lineproof.beams.continuous.resistance_cover import (
    COUNT,
    FACES,
    Coverage,
    Station,
    covered,
    ratio_of,
    ratios,
    yield_force,
)
from lineproof.beams.continuous.resistance_demand import (
    NOTHING,
    demand_at,
    largest_at,
    stretch_at,
)
from lineproof.beams.flexure import required
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import cutoff as clause
from lineproof.standards.a23_3 import flexure, shear_bars

COVERAGE = "coverage"
SHOWN = 11
"""Stations a span in the table, evenly spaced between the faces."""
METHOD = (
    "Every bar counts in proportion to the distance from its end, in full from its development "
    "length on; a hook from its outside over its own length; like bars that are lapped count as "
    "one. The bars carry the moment of every load case, and with the shear of the same case the "
    "tension of 11.3.9.2, which need not exceed what the largest "
    "moment of that face needs alone. Compression bars are not counted. Looked at: {count} "
    "stations a span and wherever the shear jumps."
)


def record_coverage(
    writers: Writers, lengths: Lengths, hooked: Hooks, runs: Runs, count: int = COUNT
) -> Coverage:
    """Record table and worst stations of the resistance as detailed; return what was found."""
    found = covered(writers.designed, runs, count)
    standing = stand(writers.designed, runs)
    for face in FACES:
        _record_moment(writers, lengths, hooked, standing, found, face)
        _record_tension(writers, lengths, hooked, standing, found, face)
    _record_table(writers, standing, found, count)
    return found


def _worst(stations: Sequence[Station], face: Face, *, tension: bool) -> Station:
    def ratio(station: Station) -> float:
        return ratio_of(*((station.F, station.F_r) if tension else (station.M_f, station.M_r)))

    return max((s for s in stations if s.face == face), key=ratio)


def _near(writers: Writers, station: Station) -> tuple[End, float]:
    """Return the nearer support of a station and its distance from that axis."""
    length = writers.designed.outline.lengths[station.span - 1]
    if station.local <= length / 2:
        return "left", station.local
    return "right", length - station.local


def _record_moment(
    writers: Writers,
    lengths: Lengths,
    hooked: Hooks,
    standing: Sequence[Standing],
    found: Coverage,
    face: Face,
) -> None:
    station = _worst(found.by_moment, face, tension=False)
    if station.M_f <= NOTHING:
        return
    near, t = _near(writers, station)
    title = (
        f"{face.capitalize()} bars: the station that their moment uses most, span {station.span}"
    )
    if station.M_r <= 0:
        _record_nothing(writers, station, title)
        return
    with writers.sheet.part(f"{COVERAGE}-{face}", title):
        steps = _developed(writers, lengths, hooked, standing, station)
        record_resistance(steps, writers, face)
        x = _record_place(writers, station, near, t)
        demand = _demand(writers, station, tension=False)
        writers.forces(steps, demand, near, x)
        steps.check(flexure.STRENGTH)


def _record_nothing(writers: Writers, station: Station, title: str) -> None:
    """Record a check that fails: no bars count at a station that a moment asks for."""
    sheet, face = writers.sheet, station.face
    near, t = _near(writers, station)
    with sheet.part(f"{COVERAGE}-{face}", title):
        sheet.note(
            "no-bars",
            f"At {station.local:g} mm from the left axis of span {station.span} no {face} bars "
            "count: none stand there, or they end there.",
            title="Gap",
        )
        steps = begin(writers, sheet, station.span, face)
        x = _record_place(writers, station, near, t)
        writers.forces(steps, _demand(writers, station, tension=False), near, x)
        steps.bind(M_r=sheet.given("M_r", "0 kN.m", source="no bars"))
        steps.check(flexure.STRENGTH)


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
    both = [forces.demand(station.span, x, s, row) for s in ("left", "right")]
    return max(both, key=lambda d: abs(d.V))


def _developed(
    writers: Writers,
    lengths: Lengths,
    hooked: Hooks,
    standing: Sequence[Standing],
    station: Station,
) -> Steps:
    """Record inside the open part the bars of a station, counted as far as they are developed."""
    designed = writers.designed
    steps = begin(writers, writers.sheet, station.span, station.face)
    rows: dict[tuple[Group, float, str], tuple[Group, float, Entry]] = {}
    for bars in standing:
        if bars.run.face != station.face:
            continue
        part = float(bars.developed(np.array([station.x]))[0])
        if part <= 0:
            continue
        l_av, needed = _available(writers, lengths, hooked, bars, station.x)
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
        raise UserError(
            f"bars: no {station.face} bars count at {station.local:g} mm from the left axis of "
            f"span {station.span} (mark {designed.outline.axes[station.span - 1]:g} mm), where the "
            f"moment is {station.M_f / 1e6:.1f} kN.m; write bars that cover it"
        )
    record_developed(steps, rows.values())
    return steps


def _available(
    writers: Writers, lengths: Lengths, hooked: Hooks, bars: Standing, x: float
) -> tuple[float, Entry]:
    """Return the length to the end that governs, and the recorded length needed there."""
    recorded = lengths[bar_of(writers.designed, bars.run)]
    last = len(writers.designed.outline.supports)
    ends = (
        (x - bars.run.start, bars.rise_start, bars.run.hook_start, bars.lap_start, 1),
        (bars.run.end - x, bars.rise_end, bars.run.hook_end, bars.lap_end, last),
    )
    length, rise, hook, lap, support = min(ends, key=lambda end: end[0] / end[1])
    if hook:
        return length, hooked[support, bars.run.size]
    if lap and length < rise and rise > recorded["l_s"].value:
        return length, _overlap(writers.sheet, rise)
    return length, recorded["l_s" if lap else "l_d"]


def _overlap(sheet: Sheet, length: float) -> Entry:
    """Return the overlap of lapped bars that is longer than the lap, recorded once in a part."""
    known = [e for k, e in sheet.part_entries.items() if k.startswith("l_lp")]
    for entry in known:
        if entry.value == length:
            return entry
    name = f"l_lp{len(known) or ''}"
    return sheet.given(name, plain(length, "mm"), "overlap of the lapped bars", source="as laid")


def _record_tension(
    writers: Writers,
    lengths: Lengths,
    hooked: Hooks,
    standing: Sequence[Standing],
    found: Coverage,
    face: Face,
) -> None:
    station = _worst(found.by_tension, face, tension=True)
    if station.F <= NOTHING or (station.F_r <= 0 and station.M_f > NOTHING):
        return  # nothing asked, or the gap stands with the moment
    designed, sheet = writers.designed, writers.sheet
    near, t = _near(writers, station)
    middle = sum(designed.forces.beam.faces(station.span)) / 2
    end: End = "left" if station.local < middle else "right"
    d_v = _section(writers, station, end)["d_v"]
    side = demand_at(designed, station.span, np.array([station.local])).side(face)
    capped = float(side.free[0]) > float(side.cap[0])
    cap = _record_cap(writers, station, end) if capped else None
    title = (
        f"{face.capitalize()} bars: the station that their tension uses most, span {station.span}"
    )
    with sheet.part(f"{COVERAGE}-{face}-tension", title):
        steps = _developed(writers, lengths, hooked, standing, station)
        x = sheet.given("x_st", plain(t, "mm"), source="worst of all stations")
        demand = _demand(writers, station, tension=True)
        writers.forces(steps, demand, near, x)
        _record_shear(writers, steps, station)
        helps = demand.M > 0 if face == "bottom" else demand.M < 0
        steps.bind(d_v=d_v)
        steps.line(clause.TENSION if helps else clause.TENSION_OTHER_SIDE)
        if cap is None:
            steps.check(shear_bars.TENSION_SIDE_HOLDS)
            return
        steps.bind(A_sr=cap)
        steps.line(shear_bars.TENSION_SIDE_CAPPED)
        steps.check(shear_bars.CAPPED_HOLDS)


def _record_shear(writers: Writers, steps: Steps, station: Station) -> None:
    stretch = stretch_at(writers.designed, station.x)
    if writers.designed.shear:
        writers.shear(steps, stretch)
        return
    steps.bind(
        V_s=writers.sheet.given("V_s", "0 kN", source="no stirrups counted"),
        theta=writers.sheet.given("theta", plain(stretch.theta, "deg"), source="11.3.6.3"),
    )


def _section(writers: Writers, station: Station, end: End) -> dict[str, Entry]:
    """Return the recorded section that a station belongs to; record it where there is none."""
    span, sheet = station.span, writers.sheet
    support = span if end == "left" else span + 1
    key = f"anchorage-bottom-{span}"
    if station.face == "top":
        key = f"anchorage-top-{support}-{'right' if end == 'left' else 'left'}"
    if any(part.key == key for part in sheet.parts):
        return sheet.entries_of(key)
    layers = top_layers(writers.designed, support)
    with sheet.part(f"{COVERAGE}-section", f"Top bars at support {support}"):
        record_section(writers, layers, span, "top", f"Top bars at support {support}")
    return sheet.entries_of(f"{COVERAGE}-section")


def _record_cap(writers: Writers, station: Station, end: End) -> Entry:
    """Record the steel that the largest moment of the face needs alone; return A_sr."""
    face, sheet, designed = station.face, writers.sheet, writers.designed
    section = _section(writers, station, end)
    demand = largest_at(designed, face, station.span, end)
    length = designed.outline.lengths[station.span - 1]
    near: End = "left" if demand.x <= length / 2 else "right"
    t = float(round(demand.x if near == "left" else length - demand.x))  # flat there: 1 mm is near
    at = t if near == "left" else length - t
    demand = designed.forces.demand(station.span, at, demand.side, demand.row)
    title = f"{face.capitalize()} bars: what the largest moment of span {station.span} needs alone"
    with sheet.part(f"{COVERAGE}-{face}-largest", title):
        steps = begin(writers, sheet, station.span, face)
        steps.bind(d=section["d"])
        x = sheet.given("x_st", plain(t, "mm"), source="place of the largest moment")
        writers.forces(steps, demand, near, x)
        flanged = face == "bottom" and designed.outline.h_f > 0
        required(steps, designed.outline.shape if flanged else "rectangular")
        return steps.entry("A_sr")


def _record_table(
    writers: Writers, standing: Sequence[Standing], found: Coverage, count: int
) -> None:
    sheet = writers.sheet
    with sheet.part(COVERAGE, "Resistance of the bars as detailed along the beam"):
        sheet.note("method", METHOD.format(count=count), title="Method", clause="11.3.9")
        sheet.table(
            "stations",
            ["Span", "x, m", "M bottom", "Mr bottom", "ratio", "M top", "Mr top", "ratio"],
            [row for k in range(1, len(writers.designed.outline.lengths) + 1)
             for row in _rows(writers, standing, k)],
            title="Moments in kN.m against the resistance as detailed; ratio: moment or tension",
            rests_on=_checks(writers),
        )  # fmt: skip
        for number, gap in enumerate(found.gaps, 1):
            sheet.note(f"gap-{number}", f"NOT covered: {gap}.", title="Gap")


def _checks(writers: Writers) -> list[Entry]:
    """Return the recorded checks of the worst stations."""
    return [
        entry
        for part in writers.sheet.parts
        if part.key.startswith(f"{COVERAGE}-")
        for entry in part.entries.values()
        if entry.kind == "check"
    ]


def _rows(writers: Writers, standing: Sequence[Standing], span: int) -> list[list[str]]:
    designed = writers.designed
    start, end = designed.forces.beam.faces(span)
    local = np.clip(np.round(np.linspace(start, end, SHOWN)), start, end)
    demand = demand_at(designed, span, local)
    columns = []
    for face in FACES:
        provided = provide(designed, standing, face, demand.x, np.full(len(local), span))
        side = demand.side(face)
        ratio = ratios(side, provided, yield_force(designed))
        columns.append((np.maximum(side.M, 0.0), provided.M_r, ratio))
    return [
        [str(span), f"{x / 1000:.3f}",
         *(text for M, M_r, ratio in columns for text in (
             f"{M[i] / 1e6:.0f}", f"{M_r[i] / 1e6:.0f}", _said(float(ratio[i]))))]
        for i, x in enumerate(local.tolist())
    ]  # fmt: skip


def _said(ratio: float) -> str:
    if ratio > 1 + 1e-9:
        return "FAILS" if not np.isfinite(ratio) else f"FAILS {ratio:.2f}"
    return f"{min(ratio, 0.999):.3f}" if 1 > ratio > 0.999 else f"{ratio:.2f}"  # noqa: PLR2004
