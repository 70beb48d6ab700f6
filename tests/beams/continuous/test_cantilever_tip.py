"""A heavy load at the tip of a cantilever: the top bars near the tip, seen from the root."""

from __future__ import annotations

from typing import Any

import pytest

from .flow import CALLS, run, start, without_cures

SPANS: dict[str, list[str]] = {
    "left": ["2 m", "6 m"],
    "right": ["6 m", "2 m"],
}


def tip_loaded(free: str) -> dict[str, Any]:
    """A rectangle 350 x 500 on a wall, a cantilever of 2 m with 60 kN dead load at its tip."""
    supports = ["free", "wall 300 mm", "wall 300 mm"]
    left = free == "left"
    return {
        "spans": SPANS[free], "supports": supports if left else supports[::-1],
        "h": "500 mm", "b_w": "350 mm", "h_f": None, "shape": "rectangular",
        "floor_weight": "0 kPa", "superimposed": "0 kPa", "use": "residential area",
        "spacing": "2 m", "f_c": "30 MPa", "shear_method": "simplified",
        "loads": [{"type": "D", "span": 1 if left else 2, "point": "60 kN",
                   "at": "0 m" if left else "2 m", "what": "facade"}],
        "stirrups": [{"span": k, "spacing": "200 mm"} for k in (1, 2)],
        "bar_runs": [
            {"face": "bottom", "bars": "2-15M", "start": "0.05 m" if left else "-0.1 m",
             "end": "8.1 m" if left else "7.95 m"},
            {"face": "top", "bars": "4-20M", "start": "0.05 m" if left else "-0.1 m",
             "end": "8.1 m" if left else "7.95 m"},
        ],
    }  # fmt: skip


@pytest.mark.parametrize("free", ["left", "right"])
def test_bars_not_developed_at_a_loaded_tip_fail(free: str) -> None:
    """100 mm from the tip, 1.4D: w_D 24 x 0.35 x 0.5 = 4.2, w_f 5.88 kN/m, P 84 kN.

    V_f = 84 + 0.588 = 84.59 kN, M_f = 8.4 + 0.0294 = 8.429 kN.m. d = 500 - 30 - 11.3 - 9.75 =
    448.95, d_v = 404.06; V_s = 0.85 x 200 x 400 x 404.06 x 1.428/200 = 196 kN, more than V_f.
    F_lt = 8429/404.06 + 84.59/2 x 1.4281 = 20.86 + 60.41 = 81.27 kN.
    Top bars 20M: l_d = 0.45 x 1.3 x 0.8 x 400/sqrt(30) x 19.5 = 666.5 mm; of 1200 mm2 counts
    50/666.5, 90.0 mm2: 0.85 x 90.0 x 400 = 30.6 kN.
    """
    sheet = run(without_cures(start(**tip_loaded(free))), CALLS[:7])
    made = sheet.entries_of("coverage-top-tension")
    assert made["x_st"].value == pytest.approx(1900)
    assert made["V_f"].value == pytest.approx(84.588e3, rel=1e-4)
    assert made["M_f"].value == pytest.approx(8.4294e6, rel=1e-4)
    assert made["F_lt"].value == pytest.approx(81.27e3, rel=1e-3)
    assert made["A_sd"].value == pytest.approx(1200 * 50 / 666.5, rel=1e-3)
    assert not made["bars-tension-side"]
