"""Ties around hooks of small cover at the ends of a beam (12.5.4), and the stirrups beside them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from math import ceil

from lineproof.beams.continuous.anchorage import hook_at, ties_at
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import BarRun, StirrupZone, places_of
from lineproof.standards.a23_3.bars import BARS

BESIDE_TIES = 100.0
"""Distance of the first stirrup from ties around hooks at a free end [mm] (common practice)."""
FROM_SUPPORT = 25.0
"""Least distance of a stirrup from the face of the support when a span's move towards it [mm]."""
WHOLE = 5.0
"""Half a stirrup is rounded up to this [mm] beyond the ends of the bars."""
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


def off_free_ends(designed: Designed, zones: Sequence[StirrupZone]) -> tuple[StirrupZone, ...]:
    """Return the stirrups of a beam moved inward where one stands past its bars at a free end.

    Spaces at the faces of a span are evened without looking at what is there: all stirrups of the
    span move towards the support as far as there is room, then the outermost one alone.
    """
    made = tuple(zones)
    for support in (1, len(designed.outline.supports)):
        if not designed.held(support):
            span = 1 if support == 1 else len(designed.outline.lengths)
            own = [zone for zone in made if zone.span == span]
            moved = _off_end(designed, support, own) if own else own
            rest = tuple(zone for zone in made if zone.span != span)
            made = (*moved, *rest) if support == 1 else (*rest, *moved)
    return made


def _off_end(designed: Designed, support: int, own: Sequence[StirrupZone]) -> Sequence[StirrupZone]:
    """Return the stirrups of the span at a free end, none of them past the ends of its bars."""
    end, inward = _first_tie(designed, support)
    least = ceil(BARS.number(designed.basis.stirrups.size, "d_b") / 2 / WHOLE) * WHOLE
    face = designed.outline.faces(own[0].span)[0 if inward < 0 else 1]
    places = [x for zone in own for x in places_of(zone)]
    outer, inner = min(places, key=lambda x: inward * x), max(places, key=lambda x: inward * x)
    past = least - inward * (outer - end)
    if past <= _NEAR:
        return own
    together = min(past, max(inward * (face - inner) - FROM_SUPPORT, 0.0))
    by = inward * together
    own = [replace(zone, start=zone.start + by, end=zone.end + by) for zone in own]
    return own if past - together <= _NEAR else _outer_moved(own, inward * (past - together))


def _outer_moved(own: Sequence[StirrupZone], by: float) -> list[StirrupZone]:
    """Return the stirrups of a span with the outermost moved alone: the first where it moves on."""
    ordered = sorted(own, key=lambda zone: zone.start, reverse=by < 0)
    zone, *others = ordered
    outer = zone.start if by > 0 else zone.end
    alone = replace(zone, start=outer + by, end=outer + by, number=1)
    if zone.number > 1:
        step = (zone.end - zone.start) / (zone.number - 1)
        start, end = (zone.start + step, zone.end) if by > 0 else (zone.start, zone.end - step)
        others = [replace(zone, start=start, end=end, number=zone.number - 1), *others]
    return sorted([alone, *others], key=lambda zone: zone.start)


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
