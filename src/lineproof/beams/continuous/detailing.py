"""The bars of a beam laid out: one call, plain numbers, buildable by the rules of the parts."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from math import ceil

from lineproof.beams.continuous.anchorage import hook_at, ties_at
from lineproof.beams.continuous.cutoff import DESIGN_STATIONS, Frame
from lineproof.beams.continuous.detailing_bottom import lay_bottom
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.detailing_top import lay_top
from lineproof.beams.continuous.layout import BarRun, StirrupZone, places_of

_ENDS = ((0, 1), (-1, -1))
"""The ends of a beam: the index of its support, and which way the beam lies."""
BESIDE_TIES = 100.0
"""Distance of the first stirrup from ties around hooks at a free end [mm] (common practice)."""
_NEAR = 1e-6


def lay_bars(designed: Designed, count: int = DESIGN_STATIONS) -> tuple[BarRun, ...]:
    """Return all longitudinal bars of a beam whose sections are designed, from left to right.

    ``count`` is the number of stations a span at which the bars are fitted to their demand.
    Raises :class:`UserError` where bars too thick to lap are longer than the stock.
    """
    frame = Frame.of(designed, count)
    runs = (*lay_bottom(frame), *lay_top(frame))
    return tuple(sorted(runs, key=lambda r: (r.face, r.layer, r.place, r.start)))


def beside_ties(
    designed: Designed, runs: Sequence[BarRun], zones: Sequence[StirrupZone]
) -> tuple[StirrupZone, ...]:
    """Return the stirrups of a beam without those whose place ties around hooks take.

    That is so at a free end, over the length of the hooks and the room that the next needs.
    """
    made = tuple(zones)
    for support, inward in _ENDS:
        if designed.held(_number(designed, support)) or not _spacing(designed, runs, support):
            continue
        reach = _hook_length(designed, runs, support) + BESIDE_TIES
        last = _first_tie(designed, support) + inward * reach
        kept = (_from(zone, last, inward) for zone in made)
        made = tuple(zone for zone in kept if zone is not None)
    return made


def hook_ties(
    designed: Designed, runs: Sequence[BarRun], zones: Sequence[StirrupZone]
) -> tuple[StirrupZone, ...]:
    """Return the ties around hooks of small cover at the ends of the beam (12.5.4).

    In an end support they stand over its width; at a free end up to the first stirrup, which
    stands beyond the hooks (:func:`beside_ties`).
    """
    made = []
    for support, inward in _ENDS:
        spacing = _spacing(designed, runs, support)
        if not spacing:
            continue
        first = _first_tie(designed, support)
        if designed.held(_number(designed, support)):
            width = designed.outline.supports[support].width - designed.end_cover
            number = max(int(width // spacing), 1)
            last = first + inward * (number - 1) * spacing
        else:
            length = _hook_length(designed, runs, support)
            places = [inward * (x - first) for zone in zones for x in places_of(zone)]
            beyond = (x - BESIDE_TIES for x in places if x >= length + BESIDE_TIES - _NEAR)
            reach = min(beyond, default=ceil(length / spacing) * spacing)
            number = int(reach / spacing + _NEAR) + 1
            last = first + inward * reach
            first = last - inward * (number - 1) * spacing
        start, end = sorted((first, last))
        span = 1 if support == 0 else len(designed.outline.lengths)
        stirrups = designed.basis.stirrups
        made.append(
            StirrupZone(
                span, start, end, number, spacing, stirrups.size, stirrups.legs, around_hooks=True
            )
        )
    return tuple(made)


def _number(designed: Designed, support: int) -> int:
    return 1 if support == 0 else len(designed.outline.supports)


def _spacing(designed: Designed, runs: Sequence[BarRun], support: int) -> float:
    return ties_at(designed, runs, _number(designed, support))


def _first_tie(designed: Designed, support: int) -> float:
    """Return where the outermost tie can stand: at the end of the bars."""
    inward = 1 if support == 0 else -1
    return designed.outline.ends[support] + inward * designed.end_cover


def _hook_length(designed: Designed, runs: Sequence[BarRun], support: int) -> float:
    """Return the development length of the longest hook at an end of the beam [mm]."""
    hooked = {run.size for run in runs if (run.hook_start if support == 0 else run.hook_end)}
    number = _number(designed, support)
    return max(hook_at(designed, number, size).l_dh for size in hooked)


def _from(zone: StirrupZone, last: float, inward: int) -> StirrupZone | None:
    """Return the stirrups of a zone at a place or further inward; None for none."""
    kept = [x for x in places_of(zone) if inward * (x - last) >= -_NEAR]
    return replace(zone, start=kept[0], end=kept[-1], number=len(kept)) if kept else None
