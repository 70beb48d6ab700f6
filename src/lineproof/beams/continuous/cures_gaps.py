"""What would close a gap in given bars: a longer bar, a further bar, smaller loads.

Each is tried on the bars along the beam themselves: the cover of all spans is computed again, and
the bars must lap, fit and be what may be given.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from itertools import product

import numpy as np

from lineproof.beams.bars import in_line
from lineproof.beams.choice import SIZES
from lineproof.beams.continuous import cures as find
from lineproof.beams.continuous import cures_checks
from lineproof.beams.continuous.anchorage import development_length
from lineproof.beams.continuous.cures import Cure, Utilisation, Variable
from lineproof.beams.continuous.cures_replay import bound_names
from lineproof.beams.continuous.cures_tried import Runs, Tried
from lineproof.beams.continuous.cutoff import STEP, ceil50, floor50
from lineproof.beams.continuous.cutoff_sets import text_of
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.detailing_given import bottom_places, fit, section_bars_of
from lineproof.beams.continuous.laps import bad_laps
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.resistance import Standing, provide, stand, yield_force
from lineproof.beams.continuous.resistance_cover import (
    COUNT,
    COVERAGE,
    FACES,
    ROUND_OFF,
    Coverage,
    Gap,
    gap_key,
    ratios,
    worst_key,
    worst_of,
)
from lineproof.beams.continuous.resistance_demand import NOTHING, SpanDemand, demand_at, demand_of
from lineproof.errors import UserError
from lineproof.quantity.digits import fixed
from lineproof.record import Entry
from lineproof.standards.a23_3 import flexure
from lineproof.standards.a23_3.bars import BARS

_MOST_BARS = 8
FROM = "from the axis of support 1"
_LAYERS = (1, 2)
_FARTHER = (0.0, 250.0, 500.0)
"""How much farther than a gap asks for bars are tried, where they may not end so near [mm]."""
_UP_TO = f"(up to {_MOST_BARS} of one size there, where the web takes them)"
NO_FURTHER = f"no further bars {_UP_TO}"
_NOTHING_ELSE = "without this or another check failing"
_NAMES = ("f_c", "f_y", "phi_c", "phi_s", "b", "d", "h", "b_w", "M_f")


def gap_of(design: Design, check: Entry) -> Gap | None:
    """Return the gap in the bars along the beam whose worst station a check stands for."""
    key = check.part.key
    if not key.startswith(COVERAGE):
        return None
    found = design.coverage
    for number, gap in enumerate(found.gaps, 1):
        if key == gap_key(number):
            return gap
    for face, tension in product(FACES, (False, True)):
        if key == worst_key(face, tension=tension):
            return _around(found, face, tension=tension)
    return None


def _around(found: Coverage, face: Face, *, tension: bool) -> Gap | None:
    at = worst_of(found, face, tension=tension)
    return next((gap for gap in found.gaps if gap.holds(at)), None)


def gap_cures(design: Design, gap: Gap, tried: Tried) -> list[Cure]:
    """Return what would close a gap, each verified by covering the beam again.

    Bars are verified by the whole calculation too: the gap is closed with the shear that the beam
    has with them, and no check fails that holds now.
    """
    trial = _Trial.of(design, gap, tried)
    return [*_longer(trial), _further(trial), _smaller(trial)]


@dataclass(frozen=True, eq=False, slots=True)
class _Trial:
    """A gap whose beam is covered again with other bars or other loads.

    ``demands`` are those of all spans, that of the gap first. ``bad`` tells which of their
    stations belong to other gaps, which may stay; ``laps`` are those that fail already; ``places``
    are those of the sections of the spans.
    """

    designed: Designed
    runs: Runs
    gap: Gap
    demands: tuple[SpanDemand, ...]
    bad: tuple[np.ndarray, ...]
    laps: frozenset[tuple[int, int]]
    places: tuple[float, ...]
    tried: Tried

    @classmethod
    def of(cls, design: Design, gap: Gap, tried: Tried) -> _Trial:
        designed, runs = design.designed, design.runs
        spans = range(1, len(designed.outline.lengths) + 1)
        order = sorted(spans, key=lambda span: span != gap.span)
        demands = tuple(demand_of(designed, span, COUNT) for span in order)
        standing = stand(designed, runs)
        bad = tuple(_bad(designed, standing, gap, demand) for demand in demands)
        places = tuple(bottom_places(designed.outline, designed.forces))
        return cls(designed, runs, gap, demands, bad, bad_laps(designed, runs), places, tried)

    def use(self, runs: Runs) -> float:
        """Return the largest ratio of the beam with other bars, other gaps left aside.

        Infinite where they cannot be given so, or are lapped too little. The bars of the beam keep
        their places among them.
        """
        standing, largest = stand(self.designed, runs), 0.0
        for demand, bad in zip(self.demands, self.bad, strict=True):
            made = _ratios(self.designed, standing, self.gap, demand)
            largest = max(largest, float(np.where(bad, 0.0, made).max()))
            if not find.holds(largest):
                return largest
        lapped = not bad_laps(self.designed, runs) - self.laps
        return largest if lapped and self.may_be_given(runs) else np.inf

    def may_be_given(self, runs: Runs) -> bool:
        """Tell whether bars fit into the web, and stand at the sections as they may be given."""
        if not fit(runs, self.designed.basis):
            return False
        try:
            section_bars_of(runs, self.designed.outline, self.designed.bars.holders, self.places)
        except UserError:
            return False
        return True

    def stands(self, runs: Runs) -> bool:
        """Tell whether other bars close the gap and no check fails that does not fail now."""
        return find.holds(self.use(runs)) and self.tried.closes(runs, self.runs, self.gap)

    def with_loads(self, part: float) -> float:
        """Return that of the gap with a part of all factored loads.

        Elsewhere nothing is asked that smaller loads would not ask less of.
        """
        forces = replace(self.designed.forces, factors=self.designed.forces.factors * part)
        designed = replace(self.designed, forces=forces)
        now, gap = self.demands[0], self.gap
        inside = now.local[(now.x >= gap.start) & (now.x <= gap.end)]
        demand = demand_at(designed, gap.span, inside)
        return float(_ratios(designed, stand(designed, self.runs), gap, demand).max())


def _bad(
    designed: Designed, standing: Sequence[Standing], gap: Gap, demand: SpanDemand
) -> np.ndarray:
    now = _ratios(designed, standing, gap, demand) > 1 + ROUND_OFF
    inside = (demand.x >= gap.start) & (demand.x <= gap.end)
    return now & ~(inside & (demand.span == gap.span))


def _ratios(
    designed: Designed, standing: Sequence[Standing], gap: Gap, demand: SpanDemand
) -> np.ndarray:
    spans = np.full(len(demand.x), demand.span)
    provided = provide(designed, standing, gap.face, demand.x, spans)
    return ratios(demand.side(gap.face), provided, yield_force(designed))


def _longer(trial: _Trial) -> list[Cure]:
    """Return the cures by longer bars: those that end near a gap, begin near it, or both."""
    standing = [s for s in stand(trial.designed, trial.runs) if s.run.face == trial.gap.face]
    gap = trial.gap
    ends = [s.run.end for s in standing if _near(gap, s.run.end, s.rise_end)]
    starts = [s.run.start for s in standing if _near(gap, s.run.start, s.rise_start)]
    middle = (gap.start + gap.end) / 2
    end = min(ends, key=lambda x: abs(x - middle), default=None)
    start = min(starts, key=lambda x: abs(x - middle), default=None)
    runs = [s.run for s in standing]
    ending = tuple(run for run in runs if run.end == end)
    starting = tuple(run for run in runs if run.start == start)
    made = [_moved(trial, ending, ()), _moved(trial, (), starting)]
    across = [run for run in runs if run.start in starts and run.end in ends]
    if across and not any(cure and cure.value for cure in made):
        thickest = max(across, key=lambda run: run.diameter)
        made = [_moved(trial, (thickest,), (thickest,))]
    return [cure for cure in made if cure]


def _near(gap: Gap, x: float, rise: float) -> bool:
    """Tell whether an end of bars is so near to a gap that these count less in it."""
    return gap.start - rise < x < gap.end + rise


def _moved(trial: _Trial, ending: Runs, starting: Runs) -> Cure | None:
    """Return the cure by some bars made longer at their end, others at their start; None for none.

    Bars of both are made longer on both sides by the same.
    """
    designed, gap, bars = trial.designed, trial.gap, ending or starting
    if not bars:
        return None
    (low, high), cover = designed.outline.ends, designed.end_cover
    l_d = max(development_length(designed, run) for run in bars)
    room = min(
        gap.end - gap.start + 2 * l_d,
        *(high - cover - run.end for run in ending),
        *(run.start - low - cover for run in starting),
    )
    if room < STEP:
        return None

    def longer(more: float) -> Runs:
        return tuple(
            _grown(run, more * (run in starting), more * (run in ending)) for run in trial.runs
        )

    which = f"the {text_of(bars)} that {_place(bars[0], ending, starting)}"
    both = " at both ends" if ending and starting else ""
    variable = replace(find.longer(room, which, both), beyond="")
    (cure,) = find.cures(lambda changes: trial.use(longer(changes["longer"])), {"longer": variable})
    if cure.value is None:
        return cure
    for more in (cure.value + farther for farther in _FARTHER):
        if more <= room and trial.stands(longer(more)):
            return replace(cure, value=more, text=variable.text(more, all_beyond=False))
    return Cure("longer", None, f"no greater length of {which} {_NOTHING_ELSE}")


def _grown(run: BarRun, before: float, after: float) -> BarRun:
    return replace(run, start=run.start - before, end=run.end + after)


def _place(run: BarRun, ending: Runs, starting: Runs) -> str:
    """Say where bars end or begin, or both, as the bars along the beam are given."""
    if ending and starting:
        return f"stand from {metres(run.start)} to {metres(run.end)} m {FROM}"
    if ending:
        return f"end {metres(run.end)} m {FROM}"
    return f"begin {metres(run.start)} m {FROM}"


def metres(x: float) -> str:
    """Write a place [mm] in m, with all its digits, two at least: it is to be typed back.

    >>> metres(18813.0), metres(3150.0), metres(-100.0)
    ('18.813', '3.15', '−0.10')
    """
    whole, digits = fixed(x / 1e3, 6).split(".")
    return f"{whole}.{digits.rstrip('0').ljust(2, '0')}"


def _further(trial: _Trial) -> Cure:
    """Return the cure by further bars over a gap: of the size nearby, else of a larger one."""
    gap = trial.gap
    own = [run for run in trial.runs if run.face == gap.face and run.place == "web"]
    beside = [run for run in own if run.start < gap.end and run.end > gap.start]
    least = max((run.diameter for run in beside or own), default=0.0)
    sizes = [size for size in SIZES if BARS.number(size, "d_b") >= least] or [SIZES[-1]]
    made = (_of_size(trial, size) for size in sizes)
    none = Cure("number", None, NO_FURTHER)
    return next((cure for cure in made if cure is not None), none)


def _of_size(trial: _Trial, size: str) -> Cure | None:
    """Return the cure by further bars of a size; None where no number closes the gap.

    They are as long as the gap asks for, else longer, where they may not end so near to it.
    """
    bar = BarRun(trial.gap.face, 1, 2, size, trial.gap.start, trial.gap.end)
    for index, (start, end) in enumerate(_stretches(trial, bar)):
        made = _number_of(trial, replace(bar, start=start, end=end))
        if made is None and index == 0:
            return None
        if made is not None and trial.stands((*trial.runs, made)):
            layer = "" if made.layer == 1 else ", in a second layer"
            text = (
                f"further bars {made.number}-{size} from {metres(start)} to {metres(end)} m "
                f"{FROM}{layer}"
            )
            return Cure("number", made.number, text, trial.use((*trial.runs, made)))
    return Cure("number", None, f"{NO_FURTHER} {_NOTHING_ELSE}")


def _stretches(trial: _Trial, bar: BarRun) -> Iterator[tuple[float, float]]:
    """Give the stretches along which further bars are tried, the shortest first.

    They are developed on both sides of the gap, reach farther, or are as long as bars beside it.
    """
    gap, designed = trial.gap, trial.designed
    l_d, (low, high) = development_length(designed, bar), designed.outline.ends
    near = floor50(gap.start - l_d), ceil50(gap.end + l_d)
    for farther in _FARTHER:
        start, end = near[0] - farther, near[1] + farther
        yield max(start, low + designed.end_cover), min(end, high - designed.end_cover)
    own = [run for run in trial.runs if run.face == gap.face and run.place == "web"]
    longer = {(r.start, r.end) for r in own if r.start < near[0] and r.end > near[1]}
    yield from sorted(longer, key=lambda ends: ends[1] - ends[0])


def _number_of(trial: _Trial, bar: BarRun) -> BarRun | None:
    """Return the fewest of further bars that close a gap, in the first layer that takes them.

    In a second layer they stand in line with bars of the first.
    """
    first = sum(run.number for run in _first_layer(trial))
    for number in range(1, _MOST_BARS + 1):
        for layer in _LAYERS:
            if layer > 1 and not in_line(first, number):
                continue
            made = replace(bar, number=number, layer=layer)
            if find.holds(trial.use((*trial.runs, made))):
                return made
    return None


def _first_layer(trial: _Trial) -> Runs:
    """Return the bars of the first layer in the web that cross the worst place of the gap."""
    gap, x = trial.gap, trial.gap.at.x
    return tuple(
        run for run in trial.runs
        if (run.face, run.place, run.layer) == (gap.face, "web", 1) and run.start < x < run.end
    )  # fmt: skip


def _smaller(trial: _Trial) -> Cure:
    """Return the cure by smaller loads: all of them, in per cent of those factored."""
    words = "all loads, dead load too, at {} % of what they are"
    none = "no smaller loads"
    if trial.gap.at.M_f > NOTHING and trial.gap.at.M_r <= 0:
        return Cure("loads", None, none)  # no part of a moment is carried by no bars
    variable = Variable(find.down(100, 5, 5), words, "or less", none)

    def use(changes: Mapping[str, float]) -> float:
        return trial.with_loads(changes["loads"] / 100)

    (cure,) = find.cures(use, {"loads": variable})
    return cure


def section_gap_cures(check: Entry, value: Callable[[str], float], size: str) -> list[Cure]:
    """Return the area of bars with which a section without any would carry its moment.

    ``value`` gives what a symbol stands for where the check does not say; ``size`` is that of the
    bars nearby.
    """
    needed = check.part.entries.get("A_sr")
    if needed is None:
        return []
    bound = bound_names(needed)
    values = {n: bound[n].value if n in bound else value(n) for n in _NAMES}
    values |= {"h_f": bound["h_f"].value if "h_f" in bound else 0.0, "A_s": 0.0}
    use: Utilisation = cures_checks.bending(values)
    variable = replace(
        find.steel(0.0, size, find.MOST_STEEL), words="{} mm² of bars through this section"
    )
    return list(find.cures(use, {"A_s": variable}))


def without_bars(check: Entry) -> bool:
    """Tell whether a check is that of a section of flexure in which no bars stand."""
    area = check.part.entries.get("A_s")
    kinds = (flexure.STRENGTH, flexure.ENOUGH_STEEL)
    return check.source in kinds and area is not None and area.value <= 0
