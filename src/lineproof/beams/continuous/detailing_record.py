"""Recorded: anchorage and detailing of all bars of a beam, part by part."""

from __future__ import annotations

from dataclasses import replace

from lineproof.beams.continuous.anchorage_record import (
    Lengths,
    Writers,
    record_lengths,
    sizes_of,
)
from lineproof.beams.continuous.cutoff import Frame
from lineproof.beams.continuous.cutoff_elsewhere import (
    Laid,
    assumed_restraint,
    record_ends_elsewhere,
)
from lineproof.beams.continuous.cutoff_ends import Runs, at_support, bottom_side, top_side
from lineproof.beams.continuous.cutoff_inflection import record_past_inflection
from lineproof.beams.continuous.cutoff_record import Site, record_cuts, side_key
from lineproof.beams.continuous.cutoff_support import (
    Hooks,
    record_end_bottom,
    record_end_top,
    record_hooks,
    record_into_support,
    record_restrained_end,
    record_section,
    record_zero_moment,
)
from lineproof.beams.continuous.forces import ENDS
from lineproof.beams.continuous.laps_handed_over import record_handed_over
from lineproof.beams.continuous.laps_record import record_crowded, record_laps
from lineproof.beams.continuous.resistance import top_layers
from lineproof.beams.continuous.resistance_cover import COUNT, Coverage
from lineproof.beams.continuous.resistance_record import record_coverage


def record_detailing(writers: Writers, runs: Runs, count: int = COUNT) -> Coverage:
    """Record development, hooks, cut-off points, bars into supports, laps and the coverage.

    The coverage is looked at in ``count`` stations a span, and returned. Raises
    :class:`UserError` for hooks in an edition in which they cannot be calculated, and where no
    bars count at all though a moment asks for them.
    """
    writers, lengths, hooked = record_lengths_and_ends(writers, runs)
    return record_coverage(writers, lengths, hooked, runs, count)


def record_lengths_and_ends(writers: Writers, runs: Runs) -> tuple[Writers, Lengths, Hooks]:
    """Record development, hooks, cut-off points, bars into supports and laps, no coverage.

    Returns what the coverage is recorded with. Raises :class:`UserError` as above.
    """
    designed = writers.designed
    frame = Frame.of(designed)
    lengths = record_lengths(writers, runs)
    writers = replace(writers, sizes=sizes_of(lengths))
    hooked, laid = record_hooks(writers, runs), Laid.of(designed, runs)
    for span in range(1, len(designed.outline.lengths) + 1):
        _record_bottom(writers, frame, lengths, hooked, runs, span)
    for support in range(1, len(designed.outline.supports) + 1):
        if designed.bars.top[support - 1].web:
            _record_top(writers, frame, lengths, laid, support)
    record_laps(writers, lengths, runs)
    record_handed_over(writers, lengths, runs)
    record_crowded(writers, lengths, runs)
    return writers, lengths, hooked


def _record_bottom(
    writers: Writers, frame: Frame, lengths: Lengths, hooked: Hooks, runs: Runs, span: int
) -> None:
    designed = writers.designed
    key, title = f"anchorage-bottom-{span}", f"Bottom bars of span {span}"
    with writers.sheet.part(key, title):
        layers = designed.bars.bottom[span - 1]
        section = record_section(writers, layers, span, "bottom", title)
    if designed.cantilever(span):
        return
    for near in ENDS:
        side = bottom_side(designed, runs, span, near)
        own = side_key("bottom", span, near)
        site = Site(writers, frame, lengths, side, section, own, title)
        there = replace(site, side=at_support(designed, runs, side))
        record_into_support(there)
        record_zero_moment(there, hooked)
        record_cuts(site)
        if designed.exterior(span if near == "left" else span + 1):
            record_end_bottom(there, hooked)


def _record_top(writers: Writers, frame: Frame, lengths: Lengths, laid: Laid, support: int) -> None:
    designed = writers.designed
    for towards in ENDS:
        if not designed.forces.has_span(support, towards):
            continue
        side = top_side(designed, laid.runs, support, towards)
        key = side_key("top", support, towards)
        title = f"Top bars of support {support}, span {side.span}"
        with writers.sheet.part(key, title):
            layers = top_layers(designed, support)
            section = record_section(writers, layers, side.span, "top", title)
        site = Site(writers, frame, lengths, side, section, key, title)
        if assumed_restraint(frame, side):
            record_restrained_end(site)
        else:
            record_past_inflection(site)
            record_cuts(site)
        record_ends_elsewhere(site, laid)
        if designed.exterior(support):
            record_end_top(site)
