"""Hinges of ``beam_with_gaps``: where it cracks without bars under loads of another span."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.service import record_at
from lineproof.beams.steps import Steps
from lineproof.record.recompute import recompute

from .beam_with_gaps import EXISTING, built, row
from .flow import analysed


def test_loads_that_deflect_another_span_crack_this_one_too() -> None:
    """Top bars are missing in span 1 from 3.5 to 4.9 m, live load on span 2 cracks it there.

    Half of it sustained: M_B = -(19.8*6**2/8 + 7.2*6**2/16) = -105.3 kN.m; at 4.9 m
    19.8*4.9*1.1/2 - 105.3*4.9/6 = -32.63 kN.m against 27.39. Live load on span 1 leaves -7 kN.m.
    """
    top = [row("top", "2-15M", -0.1, 3.5), row("top", "4-25M", 4.9, 12.1)]
    _, sheet = built([row("bottom", "4-20M", -0.1, 12.1), *top])
    record = sheet.close()
    made = sheet.entries_of("deflection-1")
    M_s = 19.8e6 * 4.9 * 1.1 / 2 - 105.3e6 * 4.9 / 6
    assert made["x_f"].value == 4900
    assert made["M_s"].value == pytest.approx(M_s, rel=1e-9)
    assert str((made["M_s"].extra or {})["title"]).endswith("live load as for span 2")
    failed = {"deflection-1/deflection-whole-top", "deflection-2/deflection-whole-top"}
    assert failed <= set(record.failed)
    assert recompute(record) == []


def moment_at(spans: list[str], supports: list[str], span: int, x: str, loads: list[Any]) -> float:
    """The moment of dead load at a place of a span of 400 x 500 mm with no other load [kN.m].

    The beam weighs 24*0.4*0.5 = 4.8 kN/m and carries nothing of the floor.
    """
    beam = analysed(**EXISTING | {
        "spans": spans, "supports": supports, "loads": loads, "superimposed": "0 kPa",
        "floor_weight": "0 kPa",
    })  # fmt: skip
    sheet, model = beam.sheet, beam.model
    with sheet.part("place", "Place"):
        steps = Steps(sheet, dict(span_place(sheet, model.inputs, span)))
        at = sheet.given("x_f", x, "distance from the axis of the left support")
        factors = {("D", k): 1.0 for k in range(1, len(spans) + 1)}
        record_at(steps, model, factors, "dead load", span=span, x=at)
    return float(sheet.entries_of("place")["M_s"].value) / 1e6


SINGLE = [
    {"type": "D", "span": 1, "point": "50 kN", "at": "1.5 m", "what": "column"},
    {"type": "D", "span": 1, "line": "10 kN/m", "from": "3 m", "to": "5 m", "what": "wall"},
]
V_A = 4.8 * 3 + 50 * 4.5 / 6 + 20 * 2 / 6  # 58.57 kN


@pytest.mark.parametrize(
    ("x", "M"),
    [
        ("1 m", V_A - 4.8 / 2),  # before all of them
        ("4 m", V_A * 4 - 4.8 * 4**2 / 2 - 50 * 2.5 - 10 * 1**2 / 2),  # within the wall
        ("5.5 m", V_A * 5.5 - 4.8 * 5.5**2 / 2 - 50 * 4 - 20 * 1.5),  # past all of them
    ],
)
def test_the_moment_at_a_place_of_a_span_with_single_loads(x: str, M: float) -> None:
    made = moment_at(["6 m"], ["wall 300 mm", "wall 300 mm"], 1, x, SINGLE)
    assert made == pytest.approx(M, rel=1e-9)


CANTILEVER = [
    {"type": "D", "span": 2, "point": "8 kN", "at": "2 m", "what": "sign"},
    {"type": "D", "span": 2, "line": "5 kN/m", "from": "1 m", "to": "2 m", "what": "planter"},
]


@pytest.mark.parametrize(
    ("x", "M"),
    [
        ("0.5 m", -(4.8 * 1.5**2 / 2 + 8 * 1.5 + 5 * 1 * 1.0)),  # outside it all of both
        ("1.5 m", -(4.8 * 0.5**2 / 2 + 8 * 0.5 + 5 * 0.5**2 / 2)),  # within the planter
    ],
)
def test_the_moment_at_a_place_of_a_cantilever_is_that_of_the_loads_outside_it(
    x: str, M: float
) -> None:
    """Right of the beam, and mirrored left of it: the same."""
    supports = ["wall 300 mm", "column 400 mm", "free"]
    assert moment_at(["6 m", "2 m"], supports, 2, x, CANTILEVER) == pytest.approx(M, rel=1e-9)
    left = [
        CANTILEVER[0] | {"span": 1, "at": "0 m"},
        CANTILEVER[1] | {"span": 1, "from": "0 m", "to": "1 m"},
    ]
    mirrored = f"{2 - float(x.removesuffix(' m'))} m"
    made = moment_at(["2 m", "6 m"], supports[::-1], 1, mirrored, left)
    assert made == pytest.approx(M, rel=1e-9)
