"""Bars given along a beam, as built or as a designer wants them: checked as a whole."""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from dataclasses import replace
from itertools import pairwise

from lineproof.beams.bars import BarLayer, BarLayers, layer_of
from lineproof.beams.continuous.anchorage import Bar, clear_distance, holds, value
from lineproof.beams.continuous.cutoff_ends import at_section, top_section
from lineproof.beams.continuous.detailing_data import Basis, SectionBars, SupportTop
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Face
from lineproof.beams.continuous.resistance import lap_pairs
from lineproof.beams.continuous.typed_runs import FACES, LAYERS
from lineproof.errors import FaultList
from lineproof.standards.a23_3 import bars as bar_clause

MOST_SIZES = 2
"""Sizes of bars that may stand in one layer."""


def check_layers(runs: tuple[BarRun, ...], basis: Basis) -> None:
    """Raise :class:`UserError` about every layer too full for the web.

    Whether the bars carry the moments is for ``covered`` to say.
    """
    faults = FaultList()
    _check_layers(runs, basis, faults)
    faults.raise_if_any()


def _places(runs: Iterable[BarRun], outline: BeamOutline) -> list[float]:
    """Return places between all ends of bars, where what stands there can be counted."""
    return [(a + b) / 2 for a, b in _stretches(runs, outline)]


def _stretches(runs: Iterable[BarRun], outline: BeamOutline) -> list[tuple[float, float]]:
    """Return the stretches between all ends of bars."""
    ends = sorted({outline.ends[0], outline.ends[1], *(x for r in runs for x in (r.start, r.end))})
    return list(pairwise(ends))


def fit(runs: tuple[BarRun, ...], basis: Basis) -> bool:
    """Tell whether bars fit into the web beside each other, wherever they stand."""
    faults = FaultList()
    _check_layers(runs, basis, faults)
    return not faults.faults


def _check_layers(runs: tuple[BarRun, ...], basis: Basis, faults: FaultList) -> None:
    """Refuse layers too full for the web; of two corner bars that are lapped one pair counts."""
    told: set[tuple[str, int]] = set()
    for x in _places(runs, basis.outline):
        for face in FACES:
            there = [r for r in at_section(runs, face, x) if r.place == "web"]
            lapped = {j for _, j in lap_pairs(there)}
            there = [r for index, r in enumerate(there) if index not in lapped]
            for layer in sorted({r.layer for r in there}):
                row = [r for r in there if r.layer == layer]
                fault = _fault_of_layer(row, basis, x)
                if fault and (face, layer) not in told:
                    told.add((face, layer))
                    faults.add(fault)


def _fault_of_layer(row: list[BarRun], basis: Basis, x: float) -> str:
    number = sum(r.number for r in row)
    thick = max(row, key=lambda r: r.diameter)
    where = f"{thick.face} bars, layer {thick.layer}, {x:.0f} mm from the axis of support 1"
    if number < 2:  # noqa: PLR2004 - no distance between the bars
        return ""
    bar = Bar(thick.face, "web", thick.layer, thick.size, number, basis.outline.depths[0])
    clear = clear_distance(basis, bar)
    least = value(bar_clause.LEAST_CLEAR, d_b=thick.diameter, a_max=basis.strengths.a_max)
    if not holds(bar_clause.FITS, s_min=least, s_c=clear):
        second = ", or a second layer" if thick.layer == 1 else ""
        return (
            f"{where}: {number} bars up to {thick.size} stand side by side, {clear:.0f} mm apart, "
            f"at least {least:.0f} mm; write fewer bars there{second}"
        )
    return ""


def tail_cover(outline: BeamOutline, runs: Iterable[BarRun]) -> float:
    """Return the least concrete outside of the hooks of given bars [mm]; infinite without any."""
    (low, high), kept = outline.ends, tuple(runs)
    starts = (run.start - low for run in kept if run.hook_start)
    return min([*starts, *(high - run.end for run in kept if run.hook_end)], default=math.inf)


def section_bars_of(
    runs: Iterable[BarRun], outline: BeamOutline, holders: str, bottom_at: Sequence[float]
) -> SectionBars:
    """Return the bars of every section as they stand in given runs.

    ``bottom_at`` are the places of the sections of the spans along the beam [mm]. No layers where
    none stand. Raises :class:`UserError` for layers of three sizes.
    """
    kept, faults = tuple(runs), FaultList()
    bottom = [
        _web_at(kept, "bottom", x, f"span {span}", faults)
        for span, x in enumerate(bottom_at, start=1)
    ]
    top = []
    for support, built in enumerate(outline.supports, start=1):
        x, name = top_section(outline, support), f"support {support}"
        top.append(SupportTop() if built.kind == "free" else _top_at(kept, x, name, faults))
    faults.raise_if_any()
    return SectionBars(tuple(bottom), tuple(top), holders)


def bottom_places(outline: BeamOutline, forces: Forces) -> list[float]:
    """Return where the bottom bars of every span are counted along the beam [mm].

    It is where its moment is largest; of a cantilever, which has none, the middle.
    """
    return [
        sum(outline.faces(span)) / 2
        if forces.beam.cantilever(span)
        else outline.axes[span - 1] + forces.sag(span).x
        for span in range(1, len(outline.lengths) + 1)
    ]


def top_bars_at(runs: Iterable[BarRun], x: float, name: str) -> SupportTop:
    """Return the top bars that stand at a place, x from the axis of support 1 [mm].

    Raises :class:`UserError` for layers of three sizes and overhangs of two.
    """
    faults = FaultList()
    made = _top_at(tuple(runs), x, name, faults)
    faults.raise_if_any()
    return made


def _top_at(runs: tuple[BarRun, ...], x: float, name: str, faults: FaultList) -> SupportTop:
    beside = [r for r in at_section(runs, "top", x) if r.place == "overhang"]
    number, web = sum(r.number for r in beside), _web_at(runs, "top", x, name, faults)
    sizes = sorted({r.size for r in beside}, reverse=True)
    if len(sizes) > 1:
        faults.add(
            f"bar runs: {name}: {', '.join(sizes)} stand in the overhangs; write bars of one size "
            f"there, such as {sizes[-1]}"
        )
    of_web = not beside or (bool(web) and sizes == [web[0].size])
    return SupportTop(web, number, "" if of_web else sizes[0])


def beside_gap(runs: Iterable[BarRun], outline: BeamOutline, span: int, at: float) -> BarLayers:
    """Return the bottom bars of a span nearest to a place where none stand; () for none."""
    kept = tuple(runs)
    start, end = outline.faces(span)
    stretches = [(a, b) for a, b in _stretches(kept, outline) if b > start and a < end]
    for a, b in sorted(stretches, key=lambda each: max(each[0] - at, at - each[1])):
        layers = _web_at(kept, "bottom", (a + b) / 2, f"span {span}", FaultList())
        if layers:  # for the depth alone: that of the thicker bars is the smaller one
            return tuple(replace(layer, thinner=None) for layer in layers)
    return ()


def _web_at(
    runs: tuple[BarRun, ...], face: Face, x: float, name: str, faults: FaultList
) -> BarLayers:
    layers: list[BarLayer] = []
    for layer in LAYERS:
        row = [r for r in at_section(runs, face, x) if r.layer == layer and r.place == "web"]
        sizes = sorted({r.size for r in row}, reverse=True)
        if len(sizes) > MOST_SIZES:
            faults.add(
                f"bar runs: {name}: {', '.join(sizes)} stand in layer {layer} of the {face} bars; "
                f"write at most two sizes a layer, such as {sizes[0]} and {sizes[-1]}"
            )
        if row and len(layers) < layer - 1:
            faults.add(
                f"bar runs: {name}: {' + '.join(f'{r.number}-{r.size}' for r in row)} stand in "
                f"layer {layer} of the {face} bars without a first layer; write layer 1 for them, "
                "or bars of layer 1 that pass there"
            )
        elif row:
            layers.append(layer_of(BarLayer(r.number, r.size) for r in row))
    return tuple(layers)
