"""Bottom bars through an interior support where lateral loads turn its moment.

Two spans of a frame, analysed elsewhere: gravity with the top in tension at every support, sway to
both sides with the bottom in tension at one of them.
"""

from __future__ import annotations

import math
from pathlib import Path

import pytest

from .edge_beam import failing
from .flow import run, start

SPAN, HALF = 7600.0, 225.0
PIECES = 20
CASES = {  # load [N/mm], moments at left and right ends of both spans [kN.m]
    "gravity": (44.0, -150.0, -250.0),
    "sway left": (20.0, 250.0, -400.0),
    "sway right": (20.0, -400.0, 250.0),
}


def _row(w: float, M_a: float, M_b: float, x: float) -> tuple[float, float]:
    """Return M [kN.m] and V [kN] of a span with end moments [kN.m], x in mm, by statics."""
    V = w * (SPAN / 2 - x) / 1e3 + (M_b - M_a) / (SPAN / 1e3)
    return M_a + (w * (SPAN / 2) / 1e3 + (M_b - M_a) / (SPAN / 1e3)) * x / 1e3 - w * x**2 / 2e6, V


def _frame(path: Path) -> str:
    lines = ["span,station (m),case,combination,M (kN.m),V (kN)"]
    for case, (w, M_a, M_b) in CASES.items():
        for span in (1, 2):
            for n in range(PIECES + 1):
                x = n * SPAN / PIECES
                M, V = _row(w, M_a, M_b, x)
                lines.append(f"{span},{x / 1000:.4f},{case},as the frame has it,{M:.6f},{V:.6f}")
    path.write_text("\n".join(lines) + "\n", encoding="utf-8")
    return str(path)


def test_bottom_bars_run_through_where_sway_turns_the_moment(tmp_path: Path) -> None:
    """By hand: bars of both spans, developed past the axis, carry 247 kN.m at the face.

    At the face x = 0.225 m of sway left, from the left axis of span 2:
    V = 20*3.8 - 650/7.6 = -9.526 kN, M = 250 - 9.526*0.225 - 20*0.225**2/2 = 247.35 kN.m.
    With d = 620 - 30 - 11.3 - 25.2/2 = 566.1 mm at most, the tension is at least
    247.35/0.5661 = 437 kN: 437/(0.85*0.4) = 1285 mm2 of bars developed at that face.
    A bar of 25M needs 0.45*400*25.2/sqrt(32) = 802 mm for that, one of 20M 0.8*0.45*400*19.5/
    sqrt(32) = 496 mm (12.2.3).
    """
    M, V = _row(*CASES["sway left"], HALF)
    assert pytest.approx(247.35, abs=0.01) == M
    assert pytest.approx(20 * (3.8 - 0.225) - 650 / 7.6, abs=0.001) == V
    beam = start(
        spans=["7.6 m", "7.6 m"], supports=["column 450 mm"] * 3, forces_csv=_frame(tmp_path / "f")
    )
    assert failing(run(beam)) == []

    lengths = {
        size: k_4 * 0.45 * 400 * d_b / math.sqrt(32)
        for size, k_4, d_b in (
            ("15M", 0.8, 16.0), ("20M", 0.8, 19.5), ("25M", 1.0, 25.2), ("30M", 1.0, 29.9),
        )
    }  # fmt: skip
    area = {"15M": 200.0, "20M": 300.0, "25M": 500.0, "30M": 700.0}
    bottom = [run for run in beam.design.runs if run.face == "bottom"]
    for face in (SPAN - HALF, SPAN + HALF):
        held = sum(
            run.number * area[run.size] * min((face - run.start) / lengths[run.size], 1.0,
                                              (run.end - face) / lengths[run.size])
            for run in bottom
            if run.start < face < run.end
        )  # fmt: skip
        assert held >= 1285.0


def test_bottom_bars_hold_torsion_where_sway_lifts_an_end(tmp_path: Path) -> None:
    """The end support pulls the beam down: its section of shear is the face, bottom in tension.

    Bars that end straight there were laid without the torsion, and failed their own check.
    """
    path = Path(_frame(tmp_path / "f"))
    head, *rows = path.read_text(encoding="utf-8").splitlines()
    turned = [f"{head},T (kN.m)"]
    for row in rows:
        x = float(row.split(",")[1])
        turned.append(f"{row},{8 * (3.8 - x):.4f}")
    path.write_text("\n".join(turned) + "\n", encoding="utf-8")
    beam = start(
        spans=["7.6 m", "7.6 m"], supports=["column 450 mm"] * 3, forces_csv=str(path),
        closed_stirrups=True, torsion="equilibrium", shape="L", tributary_width="1.7 m",
    )  # fmt: skip
    assert failing(run(beam)) == []
