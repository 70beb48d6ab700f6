"""Bars that count at a place, as far as they are developed there: in numbers and as lines.

Of given bars strength, summary and cracked sections take the area counted here. It is that of the
resistance along the beam (``resistance.provide``) or less, written so that it is followed by hand:
two like bars that are lapped and together reach yield stand as one, and of two unlike ones, one of
which reaches yield, that one stands alone.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, replace

from lineproof.beams.continuous.anchorage_record import plain
from lineproof.beams.continuous.cutoff_sets import Group, groups_met, record_second_depth
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.model import Model
from lineproof.beams.continuous.resistance import Standing, alike, in_line, lap_pairs
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars as clause
from lineproof.standards.a23_3 import development
from lineproof.standards.a23_3.bars import BARS

_SAME = 1e-9
NOTE = (
    "Bars count here in proportion to the distance to their nearer end, in full from their "
    "development length on; two bars that are lapped count as one."
)


@dataclass(frozen=True, slots=True)
class Developed:
    """Bars that count at a place: in full, or for ``length`` of the ``rise`` needed [mm].

    ``from_start`` tells from which end of the bars.
    """

    run: BarRun
    length: float
    rise: float
    from_start: bool = True

    @property
    def whole(self) -> bool:
        """Whether they count in full."""
        return self.length >= self.rise * (1 - _SAME)

    @property
    def part(self) -> float:
        """The part of their area that counts."""
        return min(self.length / self.rise, 1.0)

    @property
    def area(self) -> float:
        """Area that counts [mm2]."""
        return self.run.area * self.part


def developed_at(standing: Sequence[Standing], face: Face, x: float) -> tuple[Developed, ...]:
    """Return the bars of a face that count at a place along the beam, x from support 1 [mm]."""
    own = [bars for bars in standing if bars.run.face == face]
    found = {i: made for i, bars in enumerate(own) if (made := _of(bars, x)).length > 0}
    aside: set[int] = set()
    for i, j in lap_pairs([bars.run for bars in own], in_line):
        if i not in found or j not in found:
            continue
        like = alike(own[i].run, own[j].run)
        if like and not own[i].lap_end:
            continue  # the soffit steps there
        more, less = sorted((i, j), key=lambda n: found[n].area, reverse=True)
        if like and found[i].part + found[j].part >= 1 - _SAME:
            found[more] = replace(found[more], length=found[more].rise)
            aside.add(less)
        elif not like and found[more].whole:
            aside.add(less)
        elif not like and found[less].whole:
            aside.add(more)
    return tuple(made for i, made in found.items() if i not in aside)


def _of(bars: Standing, x: float) -> Developed:
    """Return a run with the end that governs: its distance from x, and that needed."""
    ends = (
        Developed(bars.run, x - bars.run.start, bars.rise_start),
        Developed(bars.run, bars.run.end - x, bars.rise_end, from_start=False),
    )
    return min(ends, key=lambda end: end.length / end.rise)


def area_of(counted: Iterable[Developed]) -> float:
    """Return the area that counts [mm2]."""
    return sum(each.area for each in counted)


def same(first: Sequence[Developed], second: Sequence[Developed]) -> bool:
    """Tell whether the same bars count alike at two places."""
    pairs = zip(first, second, strict=False)
    return len(first) == len(second) and all(
        a.run is b.run and abs(a.part - b.part) <= _SAME for a, b in pairs
    )


def developed_key(key: str) -> str:
    """Return the key of the part that holds the bars developed in part at a section."""
    return f"{key}-developed"


def bars_of(sheet: Sheet, key: str) -> dict[str, Entry]:
    """Return d and A_s that count at a recorded section; empty where no bars do.

    ``key`` is that of the part of the section. Bars that count in part have one of their own.
    """
    parts = {part.key: part.entries for part in sheet.parts}
    made = parts.get(developed_key(key), parts[key])
    return counted_in(made)


def counted_in(made: Mapping[str, Entry]) -> dict[str, Entry]:
    """Return d and A_s of a part: of bars of one kind in part, as far as developed."""
    area = made.get("A_sd", made["A_s"])
    return {"d": made["d"], "A_s": area} if area.value > 0 else {}


def count_standing(steps: Steps, key: str) -> None:
    """Let A_s be all bars at a section, for their number: a crack meets each, developed or not.

    ``key`` is that of the part of the section, which is open. Of groups that count in part the
    sum of all is recorded; several that count in full stand for all.
    """
    area = steps.sheet.part_entries.get("A_s")
    parts = {part.key: part.entries for part in steps.sheet.parts}
    made = parts.get(developed_key(key), {})
    if area is None and any(name.startswith("A_sd") for name in made):
        area = made["A_s1"]
        last = sum(name.startswith("n_") for name in made)
        for number in range(2, last + 1):
            symbol = "A_sall" if number == last else f"A_sall{number - 1}"
            area = steps.line(clause.STANDING_AREA, symbol, A_s1=area, A_s2=made[f"A_s{number}"])
    if area is not None:
        steps.bind(A_s=area)


def record_developed_bars(
    model: Model,
    designed: Designed,
    counted: Sequence[Developed],
    *,
    key: str,
    title: str,
    span: int,
    note: str = NOTE,
    where: str = "this section",
) -> dict[str, Entry]:
    """Record a part with bars that count at a place of a span; return their d and A_s."""
    sheet = model.sheet
    place = {"h": span_place(sheet, model.inputs, span)["h"], "c_c": sheet.find("c_c")}
    with sheet.part(key, title):
        sheet.note("counted", note, title="Bars that count", clause="12.1.1")
        steps = Steps(sheet, place)
        stirrup = designed.basis.stirrups.size
        steps.bind(d_bs=sheet.lookup("d_bs", BARS, stirrup, "d_b"))
        record_groups(steps, _groups(designed, counted), where)
    return counted_in(sheet.entries_of(key))


Counted = tuple[Group, Developed | None]
"""Bars of one size in one layer; with their ends where they count in part."""


def _groups(designed: Designed, bars: Iterable[Developed]) -> tuple[Counted, ...]:
    """Return the bars by layer and size, those counted in part by their ends as well."""
    kept = tuple(bars)
    whole = groups_met(designed, (each.run for each in kept if each.whole))
    part: dict[tuple[float, float, bool], list[Developed]] = {}
    for each in kept:
        if not each.whole:
            part.setdefault((each.length, each.rise, each.from_start), []).append(each)
    return (
        *((group, None) for group in whole),
        *(
            (group, alike[0])
            for alike in part.values()
            for group in groups_met(designed, (each.run for each in alike))
        ),
    )


def record_groups(steps: Steps, groups: Sequence[Counted], where: str) -> None:
    """Record area and depth of every group and, of several, of all together as A_s and d."""
    A = d = None
    for index, group in enumerate(groups, start=1):
        mark = "" if len(groups) == 1 else str(index)
        own = _record_group(steps, group, mark, where)
        if A is None or d is None:
            A, d = own
            continue
        last = index == len(groups)
        pair = {"A_s1": A, "A_s2": own[0], "d_1": d, "d_2": own[1]}
        areas = {n: pair[n] for n in ("A_s1", "A_s2")}
        A = steps.line(clause.TOTAL_AREA, "A_s" if last else f"A_sc{index - 1}", **areas)
        d = steps.line(clause.DEPTH_TWO_LAYERS, "d" if last else f"d_c{index - 1}", **pair)


def _record_group(steps: Steps, counted: Counted, mark: str, where: str) -> tuple[Entry, Entry]:
    group, short = counted
    sheet, size = steps.sheet, group.size
    d_b = sheet.lookup(f"d_b{mark}", BARS, size, "d_b", title="diameter of the bar")
    A_b = sheet.lookup(f"A_b{mark}", BARS, size, "A_b", title="area of one bar")
    n_b = sheet.given(
        f"n_{mark}" if mark else "n_b", str(group.number), f"number of bars through {where}",
        source="as detailed",
    )  # fmt: skip
    A_s = steps.line(clause.AREA_OF_BARS, f"A_s{mark}", n_b=n_b, A_b=A_b)
    if short is not None:
        A_s = _record_part(steps, A_s, short, mark, where)
    depth = f"d_{mark}" if mark else "d"
    if group.layer == 1:
        formula = clause.DEPTH_FIRST if mark else clause.DEPTH_ONE_LAYER
        return A_s, steps.line(formula, depth, d_b=d_b)
    over = sheet.lookup(f"d_bf{mark}", BARS, group.first, "d_b", title="diameter of the bar")
    return A_s, record_second_depth(steps, depth, mark, d_b, over)


def counted_part(length: float, rise: float) -> float:
    """Return the part of bars that counts ``length`` from their end, of the ``rise`` needed [mm].

    Both lengths are rounded as they are recorded.
    """
    return min(_given_length(length) / _needed_length(rise), 1.0)


def _given_length(length: float) -> float:
    return math.floor(10 * length * (1 + _SAME)) / 10


def _needed_length(rise: float) -> float:
    return math.ceil(10 * rise * (1 - _SAME)) / 10


def _record_part(steps: Steps, A_s: Entry, short: Developed, mark: str, where: str) -> Entry:
    """Record the area of bars that are developed in part, from a place to their nearer end."""
    l_av, l_d = record_lengths(steps, short, where, mark)
    return steps.line(development.DEVELOPED_AREA, f"A_sd{mark}", A_s=A_s, l_av=l_av, l_d=l_d)


def record_lengths(
    steps: Steps, short: Developed, where: str, mark: str = ""
) -> tuple[Entry, Entry]:
    """Record how far bars reach from a place to their nearer end, and the length they need.

    The lengths are rounded to 0.1 mm, to the safe side, so that lines with them are followed by
    hand.
    """
    given = steps.sheet.given
    l_av = given(
        f"l_av{mark}", plain(_given_length(short.length), "mm"),
        f"length from {where} to the end of the bars", source="as laid",
    )  # fmt: skip
    l_d = given(
        f"l_d{mark}", plain(_needed_length(short.rise), "mm"), "length needed",
        source="anchorage, the same bars",
    )  # fmt: skip
    return l_av, l_d
