"""Slips of a hand calculation that leave out, add again or assume something, each by hand."""

from __future__ import annotations

import pytest

from lineproof.audit.data import Slip, Verdict
from lineproof.audit.graph import Graph
from lineproof.audit.slips.search import find_slips
from lineproof.record import Record
from lineproof.sheet import Sheet
from lineproof.standards.nbc import loads

from .hand import judged, typed

GIVENS = {
    "b_w": "350 mm", "h": "600 mm", "h_f": "160 mm", "b_tr": "3 m", "c_c": "40 mm",
    "d_bs": "11.3 mm", "d_b": "19.5 mm", "gamma_w": "24 kN/m3", "w_SD": "4.5 kN/m",
    "w_L": "7.2 kN/m", "l": "6.5 m", "l_n": "6.1 m", "t_f": "8 kN.m/m", "M_2": "-45 kN.m",
    "a": "30 mm", "phi_s": "0.85", "A_v": "200 mm2", "f_y": "400 MPa", "s": "300 mm",
    "theta": "32.6 deg",
}  # fmt: skip
LINES = {
    "loads": {"w_sl = gamma_w*h_f*b_tr": "kN/m", "w_wb = gamma_w*b_w*(h - h_f)": "kN/m",
              "w_D1 = w_sl + w_wb + w_SD": "kN/m", "w_L1 = w_L": "kN/m"},
    "analysis": {"R_1 = w_D1*l/2 + M_2/l": "kN"},
    "sag-1": {"w_f = 1.25*w_D1 + 1.5*w_L1": "kN/m", "d = h - c_c - d_bs - d_b/2": "mm",
              "a_b = 2*a": "mm"},
    "shear-1-left": {"d_v = max(0.9*d, 0.72*h)": "mm", "T_f = t_f*(l_n/2 - d_v)": "kN.m",
                     "V_s = phi_s*A_v*f_y*d_v*cot(theta)/s": "kN"},
    "torsion-1": {"A_oh = (b_w - 2*c_c - d_bs)*(h - 2*c_c - d_bs)": "mm2",
                  "p_h = 2*(b_w - 2*c_c - d_bs + h - 2*c_c - d_bs)": "mm"},
}  # fmt: skip


@pytest.fixture(scope="module")
def graph() -> Graph:
    sheet = Sheet("H9", "Short cuts")
    with sheet.part("given", "Given"):
        for symbol, value in GIVENS.items():
            sheet.given(symbol, value)
    for part, lines in LINES.items():
        with sheet.part(part, f"Span 1: {part}"):
            for text, unit in lines.items():
                sheet.line(text, unit=unit)
    return Graph(sheet.close())


def first(graph: Graph, entry_id: str, text: str) -> tuple[Slip, ...]:
    """Return the slips behind a number, all other lines claimed as they are."""
    claimed = dict.fromkeys(graph.nodes, "")
    return find_slips(graph, entry_id, {}, typed(graph, entry_id, text), claimed)


@pytest.mark.parametrize(
    ("entry_id", "text", "says"),
    [
        # 24 x 0.16 x (3 - 0.35) = 10.176; right is 11.52
        ("loads/w_sl", "10.176", "the slab on the clear width alone"),
        # 7.2/2
        ("loads/w_L1", "3.6", "half of the load taken"),
        # w_D1 11.52 + 3.696 + 4.5 = 19.716; w_f 24.645 + 10.8 = 35.445; + 1.25 x 3.696 = 40.065
        ("sag-1/w_f", "40.065", "1.25 times w_wb"),
        # + 3.696 = 39.141
        ("sag-1/w_f", "39.141", "added again, which the dead load holds"),
        # 19.716 x 3.25 = 64.077; right is 64.077 - 45/6.5 = 57.154
        ("analysis/R_1", "64.077", "M_2/l left out"),
        # d 538.95: d_v 485.055; 0.72 x 538.95 = 388.04; 538.95 - 15 = 523.95; 0.9 x 600 = 540
        ("shear-1-left/d_v", "388.04", "0.72*d, the factor of h put to d"),
        ("shear-1-left/d_v", "523.95", "d - a/2, the lever arm of flexure"),
        ("shear-1-left/d_v", "540", "0.9*h, the factor of d put to h"),
        # 600 - 65; right is 538.95
        ("sag-1/d", "535.0", "h - 65, a depth assumed"),
        # 8 x 3.25 = 26 at the axis; 8 x (3.05 - 0.485) = 20.52
        ("shear-1-left/T_f", "26.00", "the torsion at the axis of the support"),
        # 270 x 520 = 140 400; right is 258.7 x 508.7
        ("torsion-1/A_oh", "140400", "to the outside of the stirrup"),
        # 2 x (270 + 520) = 1580
        ("torsion-1/p_h", "1580", "to the outside of the stirrup"),
        # 0.85 x 200 x 400 x 485.055/300 = 109.95 without cot 32.6 = 1.5637
        ("shear-1-left/V_s", "109.95", "cot(theta) left out"),
    ],
)  # fmt: skip
def test_it_is_named_first(graph: Graph, entry_id: str, text: str, says: str) -> None:
    assert says in first(graph, entry_id, text)[0].sentence


def test_all_moments_of_the_supports_left_out() -> None:
    """20 x 3.25 + 45/6.5 - 12/6.5 = 70.077; without both moments 65, as of a simple span."""
    sheet = Sheet("H9", "Reaction")
    with sheet.part("given", "Given"):
        for symbol, value in {
            "w": "20 kN/m", "l": "6.5 m", "M_1": "45 kN.m", "M_2": "12 kN.m",
        }.items():  # fmt: skip
            sheet.given(symbol, value)
    with sheet.part("analysis", "Analysis"):
        sheet.line("R_1 = w*l/2 + M_1/l - M_2/l", unit="kN")
    slips = first(Graph(sheet.close()), "analysis/R_1", "65.00")
    assert "the moments at the supports left out" in slips[0].sentence


def floor(use: str, width: str) -> Record:
    """Return the loads of a beam of 8 m for a use, its live load not reduced."""
    sheet = Sheet("H10", "Live load")
    with sheet.part("given", "Given"):
        sheet.given("l_1", "8 m")
        sheet.given("b_tr", width)
    with sheet.part("loads", "Loads"):
        sheet.lookup("q_L", loads.USES, use)
        sheet.line(loads.LIVE)
    return sheet.close()


@pytest.mark.parametrize(
    ("use", "width", "text", "verdict"),
    [
        # 24 m2 > 20: 0.3 + sqrt(9.8/24) = 0.9390; 0.9390 x 2.4 x 3 = 6.761
        ("office", "3 m", "6.76", Verdict.OTHER_METHOD),
        # 16 m2: none; 0.3 + sqrt(9.8/16) = 1.08
        ("office", "2 m", "5.20", Verdict.ORIGIN),
        # 24 m2 < 80 of storage: 0.5 + sqrt(20/24) > 1; with the factor of offices 20.28
        ("library stack room", "3 m", "20.28", Verdict.ORIGIN),
        # 88 m2 > 80: 0.5 + sqrt(20/88) = 0.97673; x 7.2 x 11 = 77.357
        ("library stack room", "11 m", "77.36", Verdict.OTHER_METHOD),
    ],
)  # fmt: skip
def test_a_live_load_that_the_code_allows_to_be_reduced_is_no_error(
    use: str, width: str, text: str, verdict: Verdict
) -> None:
    found = judged(floor(use, width), {"loads/w_L": text})["loads/w_L"]
    assert found.verdict is verdict
    if verdict is Verdict.OTHER_METHOD:
        assert "reduced by NBC 4.1.5.8" in found.note
