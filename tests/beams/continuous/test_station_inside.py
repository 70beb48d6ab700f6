"""Top bars that lack inside a support: moment and shear are those of its face."""

from __future__ import annotations

import pytest

from .flow import CALLS, run, start, without_cures


def test_tension_inside_a_support_is_that_of_its_face() -> None:
    """Two spans of 6 m, a rectangle 350 x 500 on walls of 300 mm; D 4.2, L 1.9 x 8 = 15.2 kN/m.

    1.25D + 1.5L = 28.05 kN/m on both: at the axis of support 2 M = 28.05 x 6^2/8 = 126.2 kN.m,
    V = 5/8 x 28.05 x 6 = 105.2 kN; at its face, 150 mm on, M_f = 126.2 - 105.2 x 0.15 + 28.05 x
    0.15^2/2 = 110.8 kN.m, V_f = 105.2 - 4.21 = 101.0 kN. With d 450.7 and 5494 N/mm it asks for
    a = 450.7 - sqrt(450.7^2 - 2 x 110.8e6/5494) = 47.2 mm, 5494 x 47.2/340 = 763 mm2.
    2-15M run through; 3-15M begin 250 mm before the axis: l_d = 0.45 x 1.3 x 0.8 x 400/sqrt(30) x
    16 = 546.8 mm, at the axis 400 + 600 x 250/546.8 = 674 mm2 count, 150 mm on 839 mm2.
    """
    top = {"face": "top", "bars": "2-15M", "start": "-0.1 m", "end": "12.1 m"}
    sheet = run(
        without_cures(
            start(
                spans=["6 m", "6 m"], supports=["wall 300 mm"] * 3, h="500 mm", b_w="350 mm",
                h_f=None, shape="rectangular", floor_weight="0 kPa", superimposed="0 kPa",
                use="residential area", spacing="8 m", f_c="30 MPa", shear_method="simplified",
                stirrups=[{"span": k, "spacing": "200 mm"} for k in (1, 2)],
                bar_runs=[
                    {"face": "bottom", "bars": "3-20M", "start": "-0.1 m", "end": "12.1 m"},
                    top, {**top, "bars": "3-15M", "start": "5.75 m", "end": "9 m"},
                ],
            )
        ),
        CALLS[:7],
    )  # fmt: skip
    made = sheet.entries_of("coverage-gap-2")
    assert "inside" in made
    assert made["x_st"].value == pytest.approx(150)
    assert made["M_f"].value == pytest.approx(110.8e6, rel=1e-3)
    assert made["V_f"].value == pytest.approx(101.0e3, rel=1e-3)
    assert made["A_sd"].value == pytest.approx(674, rel=1e-3)
    assert made["F_ltc"].value == pytest.approx(340 * 763, rel=1e-3)
    assert not made["bars-tension-side"]
