"""The section of a beam as DXF, opened again by ezdxf."""

from __future__ import annotations

import io

import pytest
from ezdxf.filemanagement import read

from lineproof.beams.figures import BarRow, SectionShape, section_figure
from lineproof.drawing import dxf


def test_the_section_of_a_beam() -> None:
    """380 x 620 with four 25M bars (25.2 mm), cover 40 mm to an 11.3 mm stirrup."""
    figure = section_figure(
        SectionShape("T", 380, 620, 3100, 140), d=556, cover=40, stirrup_diameter=11.3,
        stirrup_label="10M stirrup", bottom=[BarRow(4, 25.2, 556, "4-25M")],
    )  # fmt: skip
    made = read(io.StringIO(dxf(figure).decode()))
    audit = made.audit()
    assert (audit.errors, audit.fixes) == ([], [])
    space = made.modelspace()
    bars = list(space.query('CIRCLE[layer=="S-REBAR"]'))
    assert [bar.dxf.radius for bar in bars] == pytest.approx([12.6] * 4)
    outer = [bars[0].dxf.center.x - 12.6, bars[-1].dxf.center.x + 12.6]
    assert outer[1] - outer[0] == pytest.approx(380 - 2 * (40 + 11.3))
    texts = {dimension.dxf.text for dimension in space.query("DIMENSION")}
    assert {"h = <>", "d = <>", "b_w = <>", "cover <>"} <= texts
    assert "b_f = 3100" in texts, "the flange is drawn shortened"
