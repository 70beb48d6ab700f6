"""Top bars at midspan of spans that hog there under service load: which run through, recorded."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass

from lineproof.beams.continuous.anchorage_record import plain
from lineproof.beams.continuous.cutoff_sets import Group, groups_met, record_second_depth
from lineproof.beams.continuous.deflection_service import Stage, StageMoments
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.resistance import (
    Standing,
    in_line,
    lap_pairs,
    stand,
)
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.standards.a23_3 import bars as clause
from lineproof.standards.a23_3 import deflection, deflection_stages, development
from lineproof.standards.a23_3.bars import BARS

_SHORT = 1e-6
_NOTE = (
    "Under service load the moment at midspan is hogging and cracks the section: the top bars are "
    "in tension. Those count in full that reach past midspan by their development length to both "
    "sides; two bars lapped there count as one. Where bars reach less, their area counts in "
    "proportion."
)


def top_key(span: int) -> str:
    """Return the key of the part that holds the top bars at midspan of a span."""
    return f"deflection-{span}-top"


def top_recorded(model: Model, span: int) -> Mapping[str, Entry] | None:
    """Return d and A_s of the top bars at midspan where they are recorded."""
    found = [part for part in model.sheet.parts if part.key == top_key(span)]
    return _bars_in(found[0].entries) if found else None


def _bars_in(made: Mapping[str, Entry]) -> dict[str, Entry]:
    """Return depth and area that count: of bars of one kind in part, as far as developed."""
    return {"d": made["d"], "A_s": made.get("A_sd", made["A_s"])}


def hogging_cracks(
    model: Model, span: int, moments: Mapping[Stage, StageMoments], earlier: float
) -> bool:
    """Tell whether hogging at midspan cracks the web at some stage; ``earlier`` moment included.

    That of an earlier stage counts where the span hogs at midspan at a later one.
    """
    f_r, b_w = (model.sheet.find(name).value for name in ("f_r", "b_w"))
    f_rd = deflection.F_R_DEFLECTION.function(f_r)
    h = span_place(model.sheet, model.inputs, span)["h"].value
    least = min(each.M_m for each in moments.values())
    if least >= 0:
        return False
    return -min(least, earlier) > deflection_stages.CRACKING_WEB.function(f_rd, b_w, h)


@dataclass(frozen=True, slots=True)
class Through:
    """Top bars that count at a place: in full, or for ``length`` of the ``rise`` needed [mm]."""

    run: BarRun
    length: float
    rise: float

    @property
    def whole(self) -> bool:
        """Whether they count in full."""
        return self.length >= self.rise


def through(standing: Sequence[Standing], x: float) -> tuple[Through, ...]:
    """Return the top bars that run through a place, counted as far as developed to both sides.

    At a lap of like bars each counts up to the middle of the lap, and one of them at the middle;
    where the lap is too short, each as far as it is developed in it.
    """
    top = [bars for bars in standing if bars.run.face == "top"]
    kept = {i for i, bars in enumerate(top) if _whole(bars, x)}
    partly = {i for i, bars in enumerate(top) if i not in kept and _short_of(bars, x).length > 0}
    for i, j in lap_pairs([bars.run for bars in top], in_line):
        if i in kept or j in kept:
            partly -= {i, j}
        if i in kept and j in kept:
            kept.discard(min(i, j, key=lambda n: top[n].run.area))
    return tuple(
        Through(top[i].run, 0.0, 0.0) if i in kept else _short_of(top[i], x)
        for i in sorted(kept | partly)
    )


def _short_of(bars: Standing, x: float) -> Through:
    """Return a run with the end that governs: its distance from x, and that needed."""
    ends = ((x - bars.run.start, bars.rise_start), (bars.run.end - x, bars.rise_end))
    length, rise = min(ends, key=lambda end: end[0] / end[1])
    return Through(bars.run, length, rise)


def _whole(bars: Standing, x: float) -> bool:
    sides = (
        (x - bars.run.start, bars.rise_start, bars.lap_start),
        (bars.run.end - x, bars.rise_end, bars.lap_end),
    )
    return all(
        length >= (rise / 2 if lap else rise) - _SHORT and length > 0 for length, rise, lap in sides
    )


def record_top(design: Design, span: int) -> Mapping[str, Entry] | None:
    """Record the top bars that run through midspan of a span; None, and no part, without any."""
    model, designed = design.model, design.designed
    axes = designed.outline.axes
    middle = (axes[span - 1] + axes[span]) / 2
    groups = _groups(designed, through(stand(designed, design.runs), middle))
    if not groups:
        return None
    sheet = model.sheet
    place = {"h": span_place(sheet, model.inputs, span)["h"], "c_c": sheet.find("c_c")}
    with sheet.part(top_key(span), f"Top bars at midspan of span {span}"):
        sheet.note("counted", _NOTE, title="Bars that count", clause="12.1.1")
        steps = Steps(sheet, place)
        stirrup = designed.basis.stirrups.size
        steps.bind(d_bs=sheet.lookup("d_bs", BARS, stirrup, "d_b"))
        _record_groups(steps, groups)
    return _bars_in(sheet.entries_of(top_key(span)))


Counted = tuple[Group, Through | None]
"""Bars of one size in one layer; with their ends where they count in part."""


def _groups(designed: Designed, bars: Iterable[Through]) -> tuple[Counted, ...]:
    """Return the bars by layer and size, those counted in part run by run."""
    kept = tuple(bars)
    whole = groups_met(designed, (each.run for each in kept if each.whole))
    part = ((groups_met(designed, (each.run,))[0], each) for each in kept if not each.whole)
    return (*((group, None) for group in whole), *part)


def _record_groups(steps: Steps, groups: Sequence[Counted]) -> None:
    """Record area and depth of every group and, of several, of all together as A_s and d."""
    A = d = None
    for index, group in enumerate(groups, start=1):
        mark = "" if len(groups) == 1 else str(index)
        own = _record_group(steps, group, mark)
        if A is None or d is None:
            A, d = own
            continue
        last = index == len(groups)
        pair = {"A_s1": A, "A_s2": own[0], "d_1": d, "d_2": own[1]}
        areas = {n: pair[n] for n in ("A_s1", "A_s2")}
        A = steps.line(clause.TOTAL_AREA, "A_s" if last else f"A_sc{index - 1}", **areas)
        d = steps.line(clause.DEPTH_TWO_LAYERS, "d" if last else f"d_c{index - 1}", **pair)


def _record_group(steps: Steps, counted: Counted, mark: str) -> tuple[Entry, Entry]:
    group, short = counted
    sheet, size = steps.sheet, group.size
    d_b = sheet.lookup(f"d_b{mark}", BARS, size, "d_b", title="diameter of the bar")
    A_b = sheet.lookup(f"A_b{mark}", BARS, size, "A_b", title="area of one bar")
    n_b = sheet.given(
        f"n_{mark}" if mark else "n_b", str(group.number), "number of bars through midspan",
        source="as detailed",
    )  # fmt: skip
    A_s = steps.line(clause.AREA_OF_BARS, f"A_s{mark}", n_b=n_b, A_b=A_b)
    if short is not None:
        A_s = _record_part(steps, A_s, short, mark)
    depth = f"d_{mark}" if mark else "d"
    if group.layer == 1:
        formula = clause.DEPTH_FIRST if mark else clause.DEPTH_ONE_LAYER
        return A_s, steps.line(formula, depth, d_b=d_b)
    over = sheet.lookup(f"d_bf{mark}", BARS, group.first, "d_b", title="diameter of the bar")
    return A_s, record_second_depth(steps, depth, mark, d_b, over)


def _record_part(steps: Steps, A_s: Entry, short: Through, mark: str) -> Entry:
    """Record the area of bars that are developed in part, from midspan to their nearer end."""
    given = steps.sheet.given
    l_av = given(
        f"l_av{mark}", plain(short.length, "mm"), "length from midspan to the end of the bars",
        source="as laid",
    )  # fmt: skip
    l_d = given(
        f"l_d{mark}", plain(short.rise, "mm"), "length needed", source="anchorage, the same bars"
    )
    return steps.line(development.DEVELOPED_AREA, f"A_sd{mark}", A_s=A_s, l_av=l_av, l_d=l_d)
