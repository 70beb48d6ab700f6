"""Recorded: the bars as detailed against every load case, as a table and at the worst stations."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

import numpy as np

from lineproof.beams.continuous.anchorage_record import Lengths, Writers
from lineproof.beams.continuous.cutoff_ends import Runs
from lineproof.beams.continuous.cutoff_support import Hooks
from lineproof.beams.continuous.layout import Face
from lineproof.beams.continuous.resistance import Standing, provide, stand, yield_force
from lineproof.beams.continuous.resistance_cover import (
    COUNT,
    COVERAGE,
    FACES,
    Coverage,
    Gap,
    Station,
    covered,
    gap_key,
    ratios,
    worst_key,
    worst_of,
)
from lineproof.beams.continuous.resistance_demand import NOTHING, demand_at
from lineproof.beams.continuous.resistance_ratio import ratio_of
from lineproof.beams.continuous.resistance_station import (
    Laid,
    record_moment,
    record_tension,
    record_turned,
)
from lineproof.beams.continuous.resistance_torsion import turned_at
from lineproof.beams.continuous.restraint import left_out
from lineproof.record import Entry

SHOWN = 11
"""Stations a span in the table, evenly spaced between the faces."""
STATIONS = [
    "Span", "x, m", "M_f positive, kN.m", "M_r positive, kN.m", "Ratio",
    "M_f negative, kN.m", "M_r negative, kN.m", "Ratio",
]  # fmt: skip
METHOD = (
    "Every bar counts in proportion to the distance from its end, in full from its development "
    "length on; a hook from its outside over its own length; like bars that are lapped count as "
    "one. The bars carry the moment of every load case, and with the shear of the same case the "
    "tension of 11.3.9.2, which need not exceed what the largest "
    "moment of that face needs alone. {torsion}Compression bars are not counted. Looked at: "
    "{count} stations a span and wherever the shear jumps."
)
_TORSION = (
    "Where torsion counts they also carry the tension of 11.3.10.6, which is not limited so, at "
    "every section of shear, each load case with its own shear, torsion and angle; nearer to a "
    "support than its critical section, that section stands for it. "
)


def record_coverage(
    writers: Writers, lengths: Lengths, hooked: Hooks, runs: Runs, count: int = COUNT
) -> Coverage:
    """Record table, worst stations and gaps of the resistance as detailed; return what was found.

    Every gap has a check that fails: that of the worst station of its face, or one of its own.
    """
    found = covered(writers.designed, runs, count)
    laid = Laid(writers, lengths, hooked, stand(writers.designed, runs), found.gaps)
    shown = [station for face in FACES for station in _record_worst(laid, found, face)]
    for number, gap in enumerate(found.gaps, 1):
        if not any(gap.holds(station) for station in shown):
            _record_gap(laid, gap, number)
    _record_table(writers, laid.standing, found, count)
    return found


def _record_worst(laid: Laid, found: Coverage, face: Face) -> Iterator[Station]:
    """Record the stations that moment and tension of a face use most; give those that fail."""
    name = f"{face.capitalize()} bars"
    station = worst_of(found, face, tension=False)
    if station.M_f > NOTHING:
        title = f"{name}: the station that their moment uses most, span {station.span}"
        record_moment(laid, station, worst_key(face, tension=False), title)
        if ratio_of(station.M_f, station.M_r) > 1:
            yield station
    station = worst_of(found, face, tension=True)
    if station.F <= NOTHING or (station.F_r <= 0 and station.M_f > NOTHING):
        return  # nothing asked, or the gap stands with the moment
    title = f"{name}: the station that their tension uses most, span {station.span}"
    record = record_tension if station.column is None else record_turned
    record(laid, station, worst_key(face, tension=True), title)
    if ratio_of(station.F, station.F_r) > 1:
        yield station


def _record_gap(laid: Laid, gap: Gap, number: int) -> None:
    """Record the worst station of a gap that holds none of those recorded for its face."""
    record = record_tension if gap.at.by_tension else record_moment
    name = f"{gap.face.capitalize()} bars"
    start, end = gap.ends
    title = f"{name}: worst station of span {gap.span} between {start} and {end} m"
    record(laid, gap.at, gap_key(number), title)


def _record_table(
    writers: Writers, standing: Sequence[Standing], found: Coverage, count: int
) -> None:
    sheet = writers.sheet
    with sheet.part(COVERAGE, "Resistance of the bars as detailed along the beam"):
        torsion = _TORSION if writers.designed.torsion else ""
        method = METHOD.format(count=count, torsion=torsion)
        sheet.note("method", method, title="Method", clause="11.3.9")
        sheet.table(
            "stations",
            STATIONS,
            [row for k in range(1, len(writers.designed.outline.lengths) + 1)
             for row in _rows(writers, standing, k)],
            title="Factored moments and resistance as detailed; ratio: of moment or tension",
            rests_on=_checks(writers),
        )  # fmt: skip
        if writers.designed.restrained:
            sheet.note("restraint", left_out(writers.designed.restrained), title="Restraint")
        for number, gap in enumerate(found.gaps, 1):
            sheet.note(f"gap-{number}", f"{gap}.", title="Stretch that fails")


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
        turned = turned_at(designed, face, span, local)
        ratio = ratios(side, provided, yield_force(designed), turned)
        columns.append((np.maximum(side.M, 0.0), provided.M_r, ratio))
    return [
        [str(span), f"{x / 1000:.3f}",
         *(text for M, M_r, ratio in columns for text in (
             f"{M[i] / 1e6:.0f}", f"{M_r[i] / 1e6:.0f}", _said(float(ratio[i]))))]
        for i, x in enumerate(local.tolist())
    ]  # fmt: skip


def _said(ratio: float) -> str:
    if ratio > 1 + 1e-9:
        return "FAILS" if not np.isfinite(ratio) else f"{ratio:.2f} FAILS"
    return f"{min(ratio, 0.999):.3f}" if 1 > ratio > 0.999 else f"{ratio:.2f}"  # noqa: PLR2004
