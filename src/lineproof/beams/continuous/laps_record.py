"""Recorded: laps, and bars that pass each other side by side: their length and their room."""

from __future__ import annotations

from collections.abc import Iterable

from lineproof.beams.bars import spaced
from lineproof.beams.continuous.anchorage import Bar, bar_of
from lineproof.beams.continuous.anchorage_record import Lengths, Writers, plain
from lineproof.beams.continuous.beside import Row, crowded, layer_with, tightest
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.resistance import level_pairs
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.record import Entry
from lineproof.standards.a23_3 import bars as bar_clause
from lineproof.standards.a23_3 import laps

_CLASS = "Both bars are spliced at one place: class B."
_CLASS_UNLIKE = (
    "Both bars are spliced at one place: class B, by the length of the thinner bars, and at least "
    "the development length of the thicker ones."
)
_AT_LAP = "bars of the layer where most stand along the lap, two that are lapped as one"


def record_laps(writers: Writers, lengths: Lengths, runs: Iterable[BarRun]) -> None:
    """Record every kind of lap in a part: size, length against what is laid, room for concrete."""
    designed, kept = writers.designed, tuple(r for r in runs if r.place != "side face")
    pairs = [
        (kept[i], kept[j])
        for i, j in sorted(level_pairs(designed.outline, kept), key=lambda p: kept[p[1]].start)
    ]
    seen: set[tuple[Bar, Bar, float, int, int, Bar]] = set()
    for first, second in pairs:
        thin, thick = sorted((first, second), key=lambda run: run.diameter)
        length = first.end - second.start
        layer = layer_with(designed, kept, first)
        row = tightest(designed.basis, layer, second.start, first.end)
        widest = bar_of(designed, row.thickest)
        sizes = (bar_of(designed, thin), bar_of(designed, thick))
        same = (*sizes, length, row.number, row.lapped, widest)
        if same not in seen:
            seen.add(same)
            laid = (length, row, lengths[widest]["d_b"])
            _record_lap(writers, lengths, (thin, thick), laid, len(seen))


def record_crowded(writers: Writers, lengths: Lengths, runs: Iterable[BarRun]) -> None:
    """Record that bars fit beside each other where more stand than in any section, laps apart."""
    sheet, designed = writers.sheet, writers.designed
    for number, row in enumerate(crowded(designed, tuple(runs)), start=1):
        bar = row.thickest
        title = f"Bars side by side: {bar.face} bars {bar.size}"
        with sheet.part(f"anchorage-beside-{number}", title):
            steps = Steps(sheet, lengths[bar_of(designed, bar)])
            place = f"{row.start / 1000:.2f} to {row.end / 1000:.2f} m from support 1"
            source = f"as laid, layer {bar.layer}, {place}, where bars pass each other"
            steps.bind(n_b=sheet.given("n_b", str(row.number), source=source))
            steps.lines(bar_clause.LEAST_CLEAR, bar_clause.CLEAR)
            steps.check(bar_clause.FITS)


def _record_lap(
    writers: Writers,
    lengths: Lengths,
    sizes: tuple[BarRun, BarRun],
    laid: tuple[float, Row, Entry],
    number: int,
) -> None:
    """Record a lap of a thinner with a thicker bar: its length, bars that stand beside.

    The distances are those of bars that all have the size of the thickest in the layer.
    """
    sheet, designed = writers.sheet, writers.designed
    (thin, thick), (length, row, d_b) = sizes, laid
    unlike = thin.size != thick.size
    other = f" with {thick.size}" if unlike else ""
    with sheet.part(f"anchorage-lap-{number}", f"Lap of {thin.face} bars {thin.size}{other}"):
        place, larger = lengths[bar_of(designed, thin)], lengths[bar_of(designed, thick)]
        steps = Steps(sheet, place)
        sheet.note(
            "class",
            _CLASS_UNLIKE if unlike else _CLASS,
            title="Class of the lap",
            clause="12.15.1",
            basis=COMMON_PRACTICE,
        )
        steps.check(laps.LAPPABLE, d_b=larger["d_b"])
        if unlike:
            steps.line(laps.TWO_SIZES, l_sn=place["l_s"], l_dk=larger["l_d"])
        provided = sheet.given("l_lp", plain(length, "mm"), source="as laid")
        steps.bind(l_lp=provided)
        steps.check(laps.LONG_ENOUGH)
        steps.bind(d_b=larger["d_b"])
        if thin.place == "web":
            n_b = sheet.given("n_b", str(spaced(row.number)), source=_AT_LAP)
            steps.line(bar_clause.CLEAR, n_b=n_b, d_b=d_b)
        steps.line(bar_clause.LEAST_CLEAR, d_b=d_b)
        if thin.place == "web":
            steps.check(bar_clause.FITS)
        steps.line(laps.CLEAR_CORNERS if row.all_corners else laps.CLEAR_PAIR)
        if not steps.decide(laps.ROOM):
            sheet.note(
                "one-above-the-other",
                "Side by side there is no room: the lapped bars stand one above the other.",
                title="Place of the lap",
                basis=COMMON_PRACTICE,
            )
