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
