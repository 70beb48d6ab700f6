"""Recorded: laps, and bars that pass each other side by side: their length and their room."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field

from lineproof.beams.bars import spaced
from lineproof.beams.continuous.anchorage import Bar, bar_of
from lineproof.beams.continuous.anchorage_record import Lengths, Writers, plain
from lineproof.beams.continuous.beside import Row, crowded, layer_with, tightest
from lineproof.beams.continuous.layout import BarRun, BeamOutline
from lineproof.beams.continuous.resistance import level_pairs, span_at
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.standards.a23_3 import bars as bar_clause
from lineproof.standards.a23_3 import laps

Place = tuple[str, int]

_CLASS = "Both bars are spliced at one place: class B."
_CLASS_UNLIKE = (
    "Both bars are spliced at one place: class B, by the length of the thinner bars, and at least "
    "the development length of the thicker ones."
)
_ONE_ABOVE = "Side by side there is no room: the lapped bars stand one above the other."
_UNDER_A_LAYER = (
    "Side by side there is no room. One above the other the lapped bars take a bar diameter from "
    "the clear distance to the other layer that stands there, which is NOT enough: the drawings "
    "move that layer inward along the lap, where d is less by as much, or stagger the laps."
)
_AT_LAP = "bars of the layer where most stand along the lap, two that are lapped as one"


@dataclass(frozen=True, slots=True)
class _Lap:
    """A kind of lap: the thinner and the thicker bar, its length [mm], the tightest row there.

    ``places`` are all that have such a lap. ``layered``: another layer stands above or below it.
    """

    thin: BarRun
    thick: BarRun
    length: float
    row: Row
    layered: bool
    places: list[Place] = field(default_factory=list)

    @property
    def title(self) -> str:
        """What is lapped, and where."""
        other = f" with {self.thick.size}" if self.thin.size != self.thick.size else ""
        return f"Lap of {self.thin.face} bars {self.thin.size}{other}, {listed(self.places)}"


def record_laps(writers: Writers, lengths: Lengths, runs: Iterable[BarRun]) -> None:
    """Record every kind of lap in a part: size, length against what is laid, room for concrete."""
    designed, kept = writers.designed, tuple(r for r in runs if r.place != "side face")
    pairs = [
        (kept[i], kept[j])
        for i, j in sorted(level_pairs(designed.outline, kept), key=lambda p: kept[p[1]].start)
    ]
    found: dict[tuple[Bar, Bar, float, int, int, Bar, bool], _Lap] = {}
    for first, second in pairs:
        thin, thick = sorted((first, second), key=lambda run: run.diameter)
        length = first.end - second.start
        row = tightest(designed.basis, layer_with(designed, kept, first), second.start, first.end)
        widest = bar_of(designed, row.thickest)
        sizes = (bar_of(designed, thin), bar_of(designed, thick))
        layered = any(_beside_layer(run, first, second) for run in kept)
        same = (*sizes, length, row.number, row.lapped, widest, layered)
        lap = found.setdefault(same, _Lap(thin, thick, length, row, layered))
        lap.places.append(_place(designed.outline, (first.end + second.start) / 2))
    for number, lap in enumerate(found.values(), start=1):
        _record_lap(writers, lengths, lap, number)


def _beside_layer(run: BarRun, first: BarRun, second: BarRun) -> bool:
    """Tell whether a run stands in another layer of the web, somewhere along a lap."""
    there = run.face == first.face and run.start < first.end and run.end > second.start
    return there and run.place == first.place == "web" and run.layer != first.layer


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


def _place(outline: BeamOutline, middle: float) -> Place:
    """Return the support over which a lap is centred, else the span, with its number."""
    for number, (axis, support) in enumerate(zip(outline.axes, outline.supports, strict=True), 1):
        if abs(middle - axis) <= support.half:
            return "support", number
    return "span", span_at(outline, middle)


def listed(places: Iterable[Place]) -> str:
    """Name places once each.

    >>> listed([("span", 3), ("span", 1), ("support", 2)])
    'spans 1, 3 and support 2'
    """
    numbers: dict[str, dict[int, None]] = {}
    for word, number in sorted(places):
        numbers.setdefault(word, {})[number] = None
    return " and ".join(
        f"{word}{'s' if len(found) > 1 else ''} {', '.join(map(str, found))}"
        for word, found in numbers.items()
    )


def _record_lap(writers: Writers, lengths: Lengths, lap: _Lap, number: int) -> None:
    """Record a lap of a thinner with a thicker bar: its length, bars that stand beside.

    The distances are those of bars that all have the size of the thickest in the layer.
    """
    sheet, designed = writers.sheet, writers.designed
    thin, thick, row = lap.thin, lap.thick, lap.row
    d_b = lengths[bar_of(designed, row.thickest)]["d_b"]
    unlike = thin.size != thick.size
    with sheet.part(f"anchorage-lap-{number}", lap.title):
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
        provided = sheet.given("l_lp", plain(lap.length, "mm"), source="as laid")
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
                _UNDER_A_LAYER if lap.layered else _ONE_ABOVE,
                title="Place of the lap",
                basis=COMMON_PRACTICE,
            )
