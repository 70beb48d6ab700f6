"""The record of point and partial loads in deflections: what each adds to a moment."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from lineproof.beams.continuous.case_forces import factor_text
from lineproof.beams.continuous.deflection_service import (
    FreeEnd,
    Point,
    Stage,
    pieces,
    two_points,
)
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.standards.a23_3 import deflection_stages as stages

Sums = Mapping[Stage, Entry]
"""What point and partial loads add to a moment, by stage; a stage without such loads is absent."""


@dataclass(frozen=True)
class LocalLoad:
    """A point load (P_s at x_P) or a partial load (w_p from x_1 to x_2), as recorded.

    Stations from the left axis of the span. ``bound`` holds sizes as specified; ``factors`` are
    those of its load type on its span by stage, as the moments of the stages have them: one that
    accompanies another load acts in part, one that does not act in a stage is absent. ``share`` is
    the sustained part that the factor of the sustained stage holds (None: none is typed of it).
    """

    bound: Mapping[str, Entry]
    factors: Mapping[Stage, float]
    share: Entry | None = None

    @property
    def partial(self) -> bool:
        """Whether it lies on part of the span."""
        return "w_p" in self.bound


def record_local(
    steps: Steps, loads: Sequence[LocalLoad], *, cantilever: FreeEnd, behind: bool = False
) -> Sums:
    """Record inside the open part what every load that acts adds, and the sum at every stage.

    ``cantilever`` is its free end, or "" for a span; ``behind`` for loads on the span behind it.
    """
    made: list[tuple[LocalLoad, Entry]] = []
    letter = "b" if behind else ""
    for load in (each for each in loads if each.factors):
        for P_s, x_P in _points(steps, load, len(made), letter, halved=behind or not cantilever):
            place = f"{letter}{len(made) + 1}"
            made.append((load, _addition(steps, P_s, x_P, place, cantilever, behind=behind)))
    sums: dict[Stage, Entry] = {}
    recorded: dict[str, Entry] = {}
    for stage in _ENDINGS:
        rows = [each for each in made if stage in each[0].factors]
        words = " + ".join(_term(load, entry, stage) for load, entry in rows)
        if rows and words not in recorded:
            recorded[words] = _sum(steps, stage, letter, words, rows)
        if rows:
            sums[stage] = recorded[words]
    return sums


def _points(
    steps: Steps, load: LocalLoad, before: int, letter: str, *, halved: bool
) -> Iterator[tuple[Entry, Entry]]:
    """Give the point loads, with their stations, that deflect the span as the load does."""
    if not load.partial:
        yield load.bound["P_s"], load.bound["x_P"]
        return
    l = steps.entry("l_bk" if letter else "l")
    w_p, start, end = (load.bound[name] for name in ("w_p", "x_1", "x_2"))
    stretches = [(start, end)]
    if halved and start.value < l.value / 2 < end.value:
        middle = steps.sheet.line(stages.MIDDLE, symbol=f"x_m{letter}{before + 1}", l=l)
        stretches = [(start, middle), (middle, end)]
    for x_1, x_2 in stretches:
        number = f"{letter}{before + 1}"
        bound: dict[str, Any] = {"x_1": x_1, "x_2": x_2}
        P_s = steps.sheet.line(stages.HALF_OF_PARTIAL, symbol=f"P_s{number}", w_p=w_p, **bound)
        for formula in (stages.FIRST_POINT, stages.SECOND_POINT):
            before += 1
            yield P_s, steps.sheet.line(formula, symbol=f"x_P{letter}{before}", **bound)


def _addition(
    steps: Steps, P_s: Entry, x_P: Entry, place: str, cantilever: FreeEnd, *, behind: bool
) -> Entry:
    """Record the distances of a point load and what it adds to the moment."""
    line, symbol = steps.sheet.line, f"M_P{place}"
    l = steps.entry("l_bk" if behind else "l")
    if behind:
        a_s = line(stages.FROM_NEARER, symbol=f"a_s{place}", x_P=x_P, l=l)
        b_s = x_P
        if cantilever == "left":
            b_s = line(
                stages.FROM_RIGHT, symbol=f"b_s{place}", x_P=x_P, l=l,
                title="Distance of the load from the far support",
            )  # fmt: skip
        return line(
            stages.POINT_LOAD_BEHIND, symbol=symbol, P_s=P_s, a_s=a_s, b_s=b_s, l_bk=l
        )  # fmt: skip
    if cantilever:
        a_s = x_P
        if cantilever == "left":
            a_s = line(stages.FROM_RIGHT, symbol=f"a_s{place}", x_P=x_P, l=l)
        return line(stages.POINT_LOAD_CANTILEVER, symbol=symbol, P_s=P_s, a_s=a_s, l=l)
    near, added = (
        f"{made.title}, load {place}" for made in (stages.FROM_NEARER, stages.POINT_LOAD)
    )
    a_s = line(stages.FROM_NEARER, symbol=f"a_s{place}", title=near, x_P=x_P, l=l)
    return line(stages.POINT_LOAD, symbol=symbol, title=added, P_s=P_s, a_s=a_s, l=l)


_ENDINGS: Mapping[Stage, str] = {"dead": "D", "sustained": "sus", "all": "DL", "rise": "R"}


_SUMMED: Mapping[Stage, str] = {
    "dead": "dead load", "sustained": "sustained load", "all": "all load",
    "rise": "least load downwards",
}  # fmt: skip


def _term(load: LocalLoad, entry: Entry, stage: Stage) -> str:
    share = load.share if stage == "sustained" else None
    factor = load.factors[stage if share is None else "all"]
    words = entry.symbol if share is None else f"{share.symbol}*{entry.symbol}"
    return words if factor == 1 else f"{factor_text(factor)}*{words}"


def _sum(
    steps: Steps, stage: Stage, letter: str, words: str, rows: Sequence[tuple[LocalLoad, Entry]]
) -> Entry:
    """Record the sum of what the loads of a stage add; one alone stands for itself."""
    if words == rows[0][1].symbol:
        return rows[0][1]
    bound: dict[str, Any] = {entry.symbol: entry for _, entry in rows}
    bound |= {load.share.symbol: load.share for load, _ in rows if load.share is not None}
    args = {name: entry for name, entry in bound.items() if name in words}
    return steps.sheet.line(
        f"M_P{letter}{_ENDINGS[stage]} = {words}", unit="kN.m", system="kN-m",
        title=f"Addition to the moment, {_SUMMED[stage]}", **args,
    )  # fmt: skip


def points_at(loads: Sequence[LocalLoad], l: float) -> tuple[Point, ...]:
    """Return the loads of the stage of all load as point loads, for curvatures of a span."""
    made: list[Point] = []
    for load in loads:
        factor = load.factors.get("all", 0.0)
        if not factor:
            continue
        if not load.partial:
            made.append(Point(factor * load.bound["P_s"].value, load.bound["x_P"].value))
            continue
        w, start, end = (float(load.bound[name].value) for name in ("w_p", "x_1", "x_2"))
        for x_1, x_2 in pieces(start, end, l, halved=True):
            made += two_points(factor * w, x_1, x_2)
    return tuple(made)
