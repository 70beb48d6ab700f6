"""Beams whose bars are laid in tests: sections designed simply, sheets with what the flow has."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import replace
from typing import Any

import numpy as np
from hypothesis import reject
from hypothesis import strategies as st

from lineproof.beams.analysis.model import Beam, Span, Support, UniformLoad
from lineproof.beams.bars import BarLayer, BarLayers
from lineproof.beams.continuous.anchorage_record import Writers, plain
from lineproof.beams.continuous.detailing_data import (
    Basis,
    Designed,
    SectionBars,
    ShearStretch,
    Stirrups,
    Strengths,
    SupportTop,
)
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.layout import BeamOutline, BuiltSupport
from lineproof.sheet import Sheet
from lineproof.standards.catalogue import NOTATION
from lineproof.standards.codes import code_pair

PAIR_19 = "NBC 2020 + A23.3:19"
PAIR_24 = "NBC 2025 + A23.3:24"
MATERIALS = Strengths(35.0, 400.0, 0.65, 0.85, 0.7975, 20.0)
DIAMETERS = {"15M": 16.0, "20M": 19.5, "25M": 25.2, "30M": 29.9}
AREAS = {"15M": 200.0, "20M": 300.0, "25M": 500.0, "30M": 700.0}


def outline_of(beam: Beam, shape: str, h: float, b_w: float, b_f: float) -> BeamOutline:
    """The concrete of a beam of one depth, columns below, cover 40 mm, slab of 150 mm."""
    spans = len(beam.spans)
    return BeamOutline(
        shape,  # type: ignore[arg-type]
        tuple(span.length for span in beam.spans),
        (h,) * spans,
        (b_f if shape != "rectangular" else b_w,) * spans,
        tuple(
            BuiltSupport(s.width, s.kind, "none" if s.kind == "free" else "column")
            for s in beam.supports
        ),
        b_w,
        150.0 if shape != "rectangular" else 0.0,
        40.0,
    )


def beam_of(
    lengths: tuple[float, ...],
    kinds: tuple[str, ...],
    *,
    D: float = 32.0,
    L: float = 26.0,
    h: float = 600.0,
    b_w: float = 350.0,
    b_f: float = 1900.0,
    width: float = 400.0,
    shape: str = "T",
    pair: str = PAIR_19,
    **more: Any,
) -> Designed:
    """A beam without its bars: uniform loads D and L [N/mm] on every span."""
    stiff = 4e10
    supports = tuple(
        Support(kind, 0.0 if kind == "free" else width, stiff if kind == "elastic" else 0.0)  # type: ignore[arg-type]
        for kind in kinds
    )
    I = b_w * h**3 / 12 * 1.6
    beam = Beam(tuple(Span.of(length, 26e3, I) for length in lengths), supports)
    loads = [
        UniformLoad(kind, k, w)
        for k in range(1, len(lengths) + 1)
        for kind, w in (("D", D), ("L", L))
    ]
    forces = Forces.of(beam, loads)
    basis = Basis(outline_of(beam, shape, h, b_w, b_f), MATERIALS, Stirrups("10M", 2, 225.0))
    return Designed(basis, forces, SectionBars((), (), "15M"), code_pair(pair), **more)


def strength(layers: BarLayers, h: float, b: float) -> float:
    """M_r of bars in one or two layers in a rectangle of width b, by hand: cover 40, 10M."""
    first = layers[0]
    A, lever = 0.0, 0.0
    for number, layer in enumerate(layers):
        away = 51.3 + DIAMETERS[layer.size] / 2
        if number:
            gap = max(1.4 * max(DIAMETERS[first.size], DIAMETERS[layer.size]), 30.0)
            away += DIAMETERS[first.size] + gap
        A += layer.number * AREAS[layer.size]
        lever += layer.number * AREAS[layer.size] * away
    d = h - lever / A
    a = 0.85 * 400 * A / (0.7975 * 0.65 * 35 * b)
    return 0.85 * 400 * A * (d - a / 2)


def layers_for(M: float, h: float, b: float, most: int, size: str) -> BarLayers:
    """The fewest bars of a size for a moment: one layer before two; drops the beam if none."""
    for number in range(2, most + 1):
        layers: BarLayers = (BarLayer(number, size),)
        if strength(layers, h, b) >= M * 1.001:
            return layers
    for second in range(2, most + 1, 2):
        layers = (BarLayer(most, size), BarLayer(second, size))
        if strength(layers, h, b) >= M * 1.001:
            return layers
    return reject()


def designed_sections(
    bare: Designed, size: str, holders: str, *, V_r: float = 1.1, V_s: float = 0.6
) -> Designed:
    """The beam with bars for its moments, and stirrups for its shears: shares of the largest."""
    outline, forces = bare.outline, bare.forces
    room = outline.b_w - 2 * 73.8
    most = math.floor(room / (2.4 * max(DIAMETERS[size], 21.0))) + 1
    top = []
    bottom = [
        layers_for(forces.sag(k).M, outline.depths[k - 1], outline.widths[k - 1], most, size)
        for k in range(1, len(outline.lengths) + 1)
    ]
    for j in range(1, len(outline.supports) + 1):
        M = max(
            (-forces.hog(j, s).M for s in ("left", "right") if forces.has_span(j, s)), default=0.0
        )
        if M <= 1e6:
            top.append(SupportTop())
            continue
        h = min(outline.depths[max(j - 2, 0) : j])
        top.append(SupportTop(layers_for(M, h, outline.b_w, most, size)))
    shear = []
    for k in range(1, len(outline.lengths) + 1):
        _, V = forces.along(k, np.array(forces.beam.faces(k)))
        largest = float(np.abs(V).max())
        a, b = outline.axes[k - 1 : k + 1]
        shear.append(ShearStretch(a, b, V_r * largest, V_s * largest))
    return replace(bare, bars=SectionBars(tuple(bottom), tuple(top), holders), shear=tuple(shear))


def three_spans(**more: Any) -> Designed:
    """7.6, 9.2, 7.6 m between columns, 25M bars chosen for the moments."""
    bare = beam_of((7600.0, 9200.0, 7600.0), ("elastic",) * 4, **more)
    return designed_sections(bare, "25M", "15M")


@st.composite
def random_beams(draw: st.DrawFn) -> Designed:
    """Beams of 1 to 4 spans, some with a cantilever, whose sections are designed for moment."""
    spans = draw(st.integers(1, 4))
    lengths = [draw(st.integers(50, 100)) * 100.0 for _ in range(spans)]
    kinds = [
        draw(st.sampled_from(["simple", "elastic", "fixed"])),
        *(draw(st.sampled_from(["elastic", "simple"])) for _ in range(spans - 1)),
        draw(st.sampled_from(["simple", "elastic", "fixed"])),
    ]
    if spans > 1 and draw(st.booleans()):
        kinds[0], lengths[0] = "free", draw(st.integers(15, 28)) * 100.0
    bare = beam_of(
        tuple(lengths), tuple(kinds),
        D=float(draw(st.integers(15, 40))), L=float(draw(st.integers(8, 30))),
        h=draw(st.sampled_from([520.0, 600.0, 700.0])), b_w=400.0,  # room for legs of 25M hooks
        width=draw(st.sampled_from([400.0, 500.0, 600.0])),
        shape=draw(st.sampled_from(["T", "L", "rectangular"])),
        breadths={1: 550.0, spans + 1: 550.0},
    )  # fmt: skip
    if draw(st.integers(0, 3)) == 0:
        outline = bare.outline
        depths = tuple(draw(st.sampled_from([600.0, 700.0])) for _ in range(spans))
        bare = replace(bare, basis=replace(bare.basis, outline=replace(outline, depths=depths)))
    size, holders = draw(
        st.sampled_from([("20M", "15M"), ("25M", "15M"), ("25M", "20M"), ("20M", "20M")])
    )
    return designed_sections(bare, size, holders)


def sheet_of(designed: Designed) -> Sheet:
    """A sheet with what the flow records before the bars are laid."""
    sheet = Sheet("B1", "Laid bars", notation=NOTATION)
    outline, s = designed.outline, designed.strengths
    with sheet.part("given", "Given"):
        for symbol, value, unit in (
            ("b_w", outline.b_w, "mm"), ("c_c", outline.cover, "mm"), ("a_max", s.a_max, "mm"),
            ("f_c", s.f_c, "MPa"), ("f_y", s.f_y, "MPa"), ("phi_c", s.phi_c, ""),
            ("phi_s", s.phi_s, ""), ("alpha_1", s.alpha_1, ""),
        ):  # fmt: skip
            sheet.given(symbol, plain(value, unit))
        if outline.h_f:
            sheet.given("h_f", plain(outline.h_f, "mm"))
    for k in range(1, len(outline.lengths) + 1):
        start, end = outline.faces(k)
        sides = 2 if outline.shape == "T" else 1
        with sheet.part(f"span-{k}", f"Span {k}"):
            sheet.given("l", plain(outline.lengths[k - 1] / 1000, "m"))
            sheet.given("l_n", plain((end - start) / 1000, "m"))
            sheet.given("h", plain(outline.depths[k - 1], "mm"))
            sheet.given("b_f", plain(outline.widths[k - 1], "mm"))
            if outline.h_f:
                sheet.given("b_o", plain((outline.widths[k - 1] - outline.b_w) / sides, "mm"))
    return sheet


def writers_of(sheet: Sheet, designed: Designed) -> Writers:
    """What the recording functions need, forces and shear resistance as given numbers."""
    return Writers(sheet, designed, lambda k: sheet.entries_of(f"span-{k}"))


def entries(data: Mapping[str, Any]) -> dict[str, Any]:
    """Entries of a record by id."""
    return {entry["id"]: entry for part in data["parts"] for entry in part["entries"]}
