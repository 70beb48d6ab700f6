"""Bar schedule of a beam: marks, numbers, cut lengths, bends and masses.

Identical bars (same face, size, hooks and dimensions) have one mark: B01, B02 .. bottom bars,
T01 .. top bars, F01 .. bars of the side faces, S01 .. stirrups, numbered from left to right.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass, replace

from lineproof.beams.continuous.bending import BentShape, bent_bar, rounded
from lineproof.beams.continuous.detailing_data import STOCK
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Detailing, StirrupZone
from lineproof.beams.continuous.schedule_served import served
from lineproof.beams.continuous.schedule_stirrups import StirrupSet, stirrup_set
from lineproof.standards.a23_3.bars import BARS

LETTERS = {"bottom": "B", "top": "T", "side face": "F"}


@dataclass(frozen=True, slots=True)
class BarItem:
    """One line of the schedule: all bars of one mark."""

    mark: str
    size: str
    number: int
    shape: BentShape
    serves: tuple[str, ...] = ()

    @property
    def length(self) -> float:
        """Length of all its bars [mm]."""
        return self.number * self.shape.cut

    @property
    def mass(self) -> float:
        """Mass of all its bars [kg], to 0.1 kg as printed, so that sums can be followed."""
        return rounded(self.number * self.shape.mass, 1)


@dataclass(frozen=True, slots=True)
class Schedule:
    """All lines: bars, then the pieces of the stirrups; ``detailing`` has the marks filled in."""

    bars: tuple[BarItem, ...]
    stirrups: tuple[BarItem, ...]
    sets: tuple[StirrupSet, ...]
    detailing: Detailing

    @property
    def items(self) -> tuple[BarItem, ...]:
        """Bars and stirrups."""
        return (*self.bars, *self.stirrups)

    @property
    def mass(self) -> float:
        """Mass of all steel [kg]."""
        return sum(item.mass for item in self.items)

    def mass_by_size(self) -> dict[str, float]:
        """Return the mass of each bar size [kg], smallest size first."""
        used = {item.size for item in self.items}
        return {
            size: sum(item.mass for item in self.items if item.size == size)
            for size in BARS.rows
            if size in used
        }


def schedule(outline: BeamOutline, detailing: Detailing, grade: str = "400R") -> Schedule:
    """Return the schedule of a beam; ``grade`` gives the bend diameters of bars."""
    bars, runs = _bars(outline, detailing.bars, grade)
    sets = [stirrup_set(outline, zone) for zone in sorted(detailing.stirrups, key=_zone_place)]
    marks = _numbered("S", (shape for each in sets for shape, _ in each.pieces))
    numbers: dict[str, int] = dict.fromkeys(marks.values(), 0)
    marked: list[StirrupSet] = []
    for each in sets:
        for shape, count in each.pieces:
            numbers[marks[shape]] += count * each.zone.number
        zone = replace(each.zone, mark="+".join(marks[shape] for shape, _ in each.pieces))
        marked.append(replace(each, zone=zone))
    stirrups = tuple(
        BarItem(mark, shape.size, numbers[mark], shape) for shape, mark in marks.items()
    )
    zones = tuple(each.zone for each in marked)
    return Schedule(bars, stirrups, tuple(marked), Detailing(runs, zones))


def shape_of(run: BarRun, grade: str) -> BentShape:
    """Return the bent shape of the bars of a run."""
    return bent_bar(run.size, run.end - run.start, run.hook_start, run.hook_end, grade)


def over_stock(detailing: Detailing, grade: str) -> tuple[str, ...]:
    """Return a sentence for each run whose cut length is more than the stock length [mm]."""
    return tuple(
        f"{run.mark or _kind(run)}: {run.number}-{run.size} has a cut length of "
        f"{shape_of(run, grade).cut:.0f} mm, more than the stock length of {STOCK:.0f} mm; "
        "it needs a lap"
        for run in detailing.bars
        if shape_of(run, grade).cut > STOCK
    )


def _kind(run: BarRun) -> str:
    return run.place if run.place == "side face" else run.face


def _bar_place(run: BarRun) -> tuple[int, int, float, float]:
    return (list(LETTERS).index(_kind(run)), run.layer, run.start, -run.end)


def _zone_place(zone: StirrupZone) -> tuple[int, float]:
    return (zone.span, zone.start)


def _numbered(letter: str, shapes: Iterable[BentShape]) -> dict[BentShape, str]:
    """Give each different shape its mark, in the order of first appearance."""
    marks: dict[BentShape, str] = {}
    for shape in shapes:
        marks.setdefault(shape, f"{letter}{len(marks) + 1:02d}")
    return marks


def _bars(
    outline: BeamOutline, runs: Sequence[BarRun], grade: str
) -> tuple[tuple[BarItem, ...], tuple[BarRun, ...]]:
    """Return the lines of the schedule and the runs with their marks, in the order given."""
    items: list[BarItem] = []
    named: dict[int, str] = {}
    order = sorted(range(len(runs)), key=lambda index: _bar_place(runs[index]))
    for kind, letter in LETTERS.items():
        mine = [index for index in order if _kind(runs[index]) == kind]
        shapes = {index: shape_of(runs[index], grade) for index in mine}
        for shape, mark in _numbered(letter, shapes.values()).items():
            same = [index for index in mine if shapes[index] == shape]
            named.update(dict.fromkeys(same, mark))
            number = sum(runs[index].number for index in same)
            texts = (served(outline, runs[i]) for i in same)
            serves = tuple(dict.fromkeys(text for text in texts if text))
            items.append(BarItem(mark, shape.size, number, shape, serves))
    marked = tuple(replace(run, mark=named[index]) for index, run in enumerate(runs))
    return tuple(items), marked
