"""Ties around hooks of small cover at the ends of a beam (12.5.4), and the stirrups beside them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from math import ceil

from lineproof.beams.continuous.anchorage import hook_at, ties_at
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import BarRun, StirrupZone, places_of

BESIDE_TIES = 100.0
"""Distance of the first stirrup from ties around hooks at a free end [mm] (common practice)."""
_NEAR = 1e-6


def beside_ties(
    designed: Designed, runs: Sequence[BarRun], zones: Sequence[StirrupZone]
) -> tuple[StirrupZone, ...]:
    """Return the stirrups of a beam without those whose place ties around hooks take.

    That is so at a free end, over the length of the hooks and the room that the next needs.
    """
    made = tuple(zones)
    for support in (1, len(designed.outline.supports)):
        if designed.held(support) or not ties_at(designed, runs, support):
            continue
        first, inward = _first_tie(designed, support)
        last = first + inward * (_hook_length(designed, runs, support) + BESIDE_TIES)
        kept = (_from(zone, last, inward) for zone in made)
        made = tuple(zone for zone in kept if zone is not None)
    return made


def hook_ties(
    designed: Designed, runs: Sequence[BarRun], zones: Sequence[StirrupZone]
) -> tuple[StirrupZone, ...]:
    """Return the ties around hooks of small cover at the ends of the beam.

    In an end support they stand over its width; at a free end up to the first stirrup, which
    stands beyond the hooks (:func:`beside_ties`).
    """
    made = []
    for support in (1, len(designed.outline.supports)):
        spacing = ties_at(designed, runs, support)
        if not spacing:
            continue
        first, inward = _first_tie(designed, support)
        if designed.held(support):
            width = designed.outline.supports[support - 1].width - designed.end_cover
            number = max(int(width // spacing), 1)
            last = first + inward * (number - 1) * spacing
        else:
            reach = _reach(designed, runs, zones, support)
            number = int(reach / spacing + _NEAR) + 1
            last = first + inward * reach
            first = last - inward * (number - 1) * spacing
        start, end = sorted((first, last))
        span = 1 if support == 1 else len(designed.outline.lengths)
        stirrups = designed.basis.stirrups
        made.append(
            StirrupZone(
                span, start, end, number, spacing, stirrups.size, stirrups.legs, around_hooks=True
            )
        )
    return tuple(made)


def _reach(
    designed: Designed, runs: Sequence[BarRun], zones: Sequence[StirrupZone], support: int
) -> float:
    """Return how far ties at a free end reach from the ends of the bars, beside a stirrup [mm]."""
    first, inward = _first_tie(designed, support)
    least = _hook_length(designed, runs, support)
    places = (inward * (x - first) for zone in zones for x in places_of(zone))
    beyond = (x - BESIDE_TIES for x in places if x >= least + BESIDE_TIES - _NEAR)
    spacing = ties_at(designed, runs, support)
    return min(beyond, default=ceil(least / spacing) * spacing)


def _first_tie(designed: Designed, support: int) -> tuple[float, int]:
    """Return where the outermost tie can stand, at the end of the bars, and which way is inward."""
    end, inward = designed.outline.end_at(support)
    return end + inward * designed.end_cover, inward


def _hook_length(designed: Designed, runs: Sequence[BarRun], support: int) -> float:
    """Return the development length of the longest hook within the web at an end [mm]."""
    sizes = {run.size for run in runs if run.bent_at(support) and not run.outside}
    return max(hook_at(designed, support, size).l_dh for size in sizes)


def _from(zone: StirrupZone, last: float, inward: int) -> StirrupZone | None:
    """Return the stirrups of a zone at a place or further inward; None for none."""
    kept = [x for x in places_of(zone) if inward * (x - last) >= -_NEAR]
    return replace(zone, start=kept[0], end=kept[-1], number=len(kept)) if kept else None
