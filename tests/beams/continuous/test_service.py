"""Service moments as lines equal the solver's; the construction stage by hand."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.beams.continuous.deflection_service import Stage
from lineproof.beams.continuous.deflections import service_of

from .flow import MIXED, analysed, close_anyway

SAME = 1e-9


@pytest.mark.parametrize("changes", [{}, MIXED], ids=["three spans", "mixed"])
def test_recorded_service_moments_are_those_of_the_solver(changes: dict[str, Any]) -> None:
    beam = analysed(**changes)
    beam.flexure()
    beam.deflections()
    model = beam.model
    stages: tuple[Stage, ...] = ("dead", "sustained", "all")
    compared = 0
    for span in range(1, model.spans + 1):
        service = service_of(model, span)
        for stage in stages:
            entries = beam.sheet.entries_of(f"deflection-{span}-{stage}")
            moments = service.stages[stage]
            names = ("M_m", "M_h1", "M_h2") if not service.free else ("M_mb", "M_hb")
            for name in (n for n in names if n in entries):
                assert entries[name].value == pytest.approx(getattr(moments, name), rel=SAME), (
                    f"span {span}, {stage}, {name}"
                )
                compared += 1
            if service.free:
                assert entries["M_h"].value == pytest.approx(moments.M_h1, rel=SAME)
                compared += 1
    assert compared >= 3 * len(stages)


def test_construction_stage_by_hand() -> None:
    """Three spans of 8 m, uniform load w on all: 0.100 w l^2 at the supports, 0.080 in span 1.

    Tables of continuous beams; the largest is 0.0800 w l^2 beside midspan, at midspan
    w l^2/8 - 0.100 w l^2/2 = 0.075 w l^2 (hand calculation).
    """
    beam = analysed(spans=["8 m"] * 3, construction_load="6 kPa")
    beam.flexure()
    beam.deflections()
    record = close_anyway(beam.sheet)
    w = record.entries["loads/w_D1"]["value"] + 6 * 3.1
    entries = record.entries
    assert entries["deflection-1-construction/M_ae2"]["value"] == pytest.approx(0.1 * w * 64)
    assert entries["deflection-1-construction/M_aem"]["value"] == pytest.approx(0.075 * w * 64)
    assert entries["deflection-1-dead/M_am"]["value"] == pytest.approx(0.075 * w * 64)


@pytest.mark.parametrize("free", ["left", "right"])
def test_the_construction_stage_cracks_the_root_of_a_cantilever(free: str) -> None:
    """A cantilever of 2.6 m, 380 x 450, slab 140 on 3.1 m: its root cracks while it is built.

    By hand: w_D = 24(0.14*3.1 + 0.38*0.31) + 1.8*3.1 = 18.8232 kN/m, w_cn = 12*3.1 = 37.2 kN/m,
    56.0232*2.6^2/2 = 189.358 kN.m, more than under dead and live load (2.4 kPa): 26.2632*3.38 =
    88.770 kN.m. So I_e is the same in all stages, with M_crdn = 0.3 sqrt(32)*380*450^2/6 =
    21.7647 kN.m and I_gw = 380*450^3/12: I_cr + (I_gw - I_cr)(21.7647/189.358)^3.
    """
    supports, spans = ["free", "column 400 mm", "wall 300 mm"], ["2.6 m", "6 m"]
    if free == "right":
        supports, spans = supports[::-1], spans[::-1]
    beam = analysed(
        spans=spans, supports=supports, h="450 mm", use="office", construction_load="12 kPa"
    )
    beam.flexure()
    beam.deflections()
    key = f"deflection-{1 if free == 'left' else 2}"
    root = beam.sheet.entries_of(f"{key}-construction")["M_ae1"]
    assert root.value == pytest.approx(189.358e6, rel=1e-5)
    I_cr = beam.sheet.entries_of(f"{key}-sections")["I_cr1"].value
    I_e = I_cr + (380 * 450**3 / 12 - I_cr) * (21.7647 / 189.358) ** 3
    for stage in ("dead", "sustained", "all"):
        entries = beam.sheet.entries_of(f"{key}-{stage}")
        assert entries["I_e1"].value == pytest.approx(I_e, rel=1e-5)
    assert entries["M_h"].value == pytest.approx(88.770e6, rel=1e-5)


def test_what_counts_of_the_snow_is_said() -> None:
    """With snow alone: of a beam without it the page says nothing."""
    for changes, said in (({"use": "roof", "snow": "2.4 kPa"}, 1), ({}, 0)):
        beam = analysed(**changes)
        beam.flexure()
        beam.deflections()
        record = close_anyway(beam.sheet)
        notes = [e["text"] for i, e in record.entries.items() if i.startswith("service/snow")]
        assert len(notes) == said
        assert all("No part of the snow load is taken as sustained" in text for text in notes)
