"""Short cuts of hand calculations, by hand, on a beam of the shape of ``hand``.

d 540, A_s 1200, f_y 400, phi_s 0.85: the force is 408 kN.
"""

from __future__ import annotations

import pytest

from lineproof.audit.data import Slip
from lineproof.audit.graph import Graph
from lineproof.audit.slips.constants import of_constant
from lineproof.audit.slips.search import find_slips
from lineproof.formula import formula
from lineproof.sheet import Sheet

from .hand import typed

GIVENS = {
    "phi_s": "0.85", "A_s": "1200 mm2", "f_y": "400 MPa", "d": "540 mm", "a": "65 mm",
    "a_r": "62 mm", "alpha_1": "0.805", "phi_c": "0.65", "f_c": "30 MPa", "b": "400 mm",
    "M_sn": "-361.5 kN.m", "V_sn": "229.2 kN", "x_f": "225 mm", "w_f": "47.8 kN/m",
    "w_D": "20.4 kN/m", "w_L": "14.9 kN/m", "M_f": "200 kN.m",
}  # fmt: skip


def slips(part: str, line: str, unit: str, text: str) -> tuple[Slip, ...]:
    """Return the slips behind a number typed for a line of which all givens are claimed."""
    sheet = Sheet("H2", "Short cuts")
    symbol = line.partition(" ")[0]
    with sheet.part("given", "Given"):
        for name, value in GIVENS.items():
            if name != symbol:
                sheet.given(name, value)
    with sheet.part(part, "Support 2, left face"):
        sheet.line(line, unit=unit)
    graph = Graph(sheet.close())
    claimed = {i: "" for i in graph.nodes if i.startswith("given/")}
    return find_slips(
        graph, f"{part}/{symbol}", {}, typed(graph, f"{part}/{symbol}", text), claimed
    )


@pytest.mark.parametrize(
    ("part", "line", "unit", "text", "says"),
    [
        # 408 x 0.9 x 0.540 = 198.288; with d - a/2 = 507.5 it is 207.06
        ("beam", "M_r = phi_s*A_s*f_y*(d - a/2)", "kN.m", "198.29", "0.9d in place of d - a/2"),
        # 361.5 - 229.2 x 0.45/3 = 327.12; at the face 361.5 - 51.57 + 1.21 = 311.14
        ("hog-2-left", "M_f = -(M_sn + V_sn*x_f - w_f*x_f**2/2)", "kN.m", "327.12", "V*b/3"),
        # 1.4 x (20.4 + 14.9) = 49.42; 1.25 x 20.4 + 1.5 x 14.9 = 47.85
        ("beam", "w_f = 1.25*w_D + 1.5*w_L", "kN/m", "49.42", "one factor for the whole"),
    ],
)
def test_a_short_cut_is_named_first(part: str, line: str, unit: str, text: str, says: str) -> None:
    assert says in slips(part, line, unit, text)[0].sentence


SECTION = {
    "b_w": "350 mm", "h": "650 mm", "b_f": "3600 mm", "h_f": "150 mm", "f_r": "3.286 MPa",
    "d": "596 mm", "f_c": "30 MPa", "f_y": "400 MPa", "phi_c": "0.65", "beta": "0.236",
    "lambda_": "1", "d_v": "536 mm", "zeta_s": "3", "delta_sus": "13.7 mm", "delta_Lr": "2.5 mm",
    "E_c": "22500 MPa", "I_ea": "1330000000 mm4", "w_s": "34.9 kN/m", "l": "6.5 m",
    "M_m": "62.6 kN.m", "M_h": "122 kN.m", "A_0": "9.8 m2", "A_L": "21 m2",
    "delta_DL": "16.2 mm", "y_b": "495 mm", "w_D1": "22.6 kN/m", "w_L1": "8.64 kN/m",
}  # fmt: skip
I_G = (
    "I_g = b_w*h**3/12 + b_w*h*(y_b - h/2)**2 + (b_f - b_w)*h_f**3/12"
    " + (b_f - b_w)*h_f*(h - h_f/2 - y_b)**2"
)


@pytest.mark.parametrize(
    ("lines", "unit", "text", "says"),
    [
        # 350 x 650^3/12 = 8.0099e9; the T section has 18.6e9
        ([I_G], "mm4", "8010000000", "b_w*h**3/12, the web alone"),
        # and 3250 x 150^3/12 = 0.9141e9 more, 8.9240e9
        ([I_G], "mm4", "8924000000", "about their own axes"),
        # 3.286 x 350 x 650^2/6 = 80.99 kN.m; the T section has 3.286 x 18.6e9/495 = 123.6
        ([I_G, "M_cr = f_r*I_g/y_b"], "kN.m", "80.99", "f_r*b_w*h**2/6, the web alone"),
        # 0.2 x 0.65 x sqrt(30) x 350 x 596 = 148.5 kN; with 0.236 and 536 it is 157.6
        (["V_c = phi_c*lambda_*beta*1.0*sqrt(f_c)*b_w*d_v", "d_x = 2*d"], "kN", "148.5",
         "A23.3-94, simplified method"),
        # 3 x 16.2 = 48.6; right is 3 x 13.7 + 2.5 = 43.6, which one digit tells from it
        (["delta_t = zeta_s*delta_sus + delta_Lr", "delta_L = delta_DL - delta_sus"], "mm",
         "48.6", "taken as sustained"),
        # 5 x 34.9 x 6500^4/(384 x 22500 x 1.33e9) = 3.1149e17/1.14912e16 = 27.107
        (["M_s = w_s*l**2/8", "delta_i = 5*l**2/(48*E_c*I_ea)*(M_m - 0.2*M_h)"], "mm", "27.107",
         "5*w_s*l**4/(384*E_c*I_ea), a simple span"),
        # 0.002 x 350 x 650 = 455; 0.2 x sqrt(30) x 350 x 650/400 = 623.0
        (["A_smin = 0.2*1.0*sqrt(f_c)*b_w*h/f_y"], "mm2", "455", "7.8.1, for slabs"),
        # 0.3 + sqrt(9.8/10.5) = 1.2661; with 21 m2 it is 0.9831
        (["r_L = 0.3 + sqrt(A_0/A_L)"], "", "1.2661", "half of the tributary area"),
        # 1.4 x 22.6 = 31.64; right is 1.25 x 22.6 + 1.5 x 8.64 = 41.21
        (["w_f = 1.25*w_D1 + 1.5*w_L1"], "kN/m", "31.64", "dead load alone, case 1"),
    ],
)  # fmt: skip
def test_another_rule_for_the_lines_own_is_named_first(
    lines: list[str], unit: str, text: str, says: str
) -> None:
    sheet = Sheet("H4", "Other rules")
    with sheet.part("given", "Given"):
        for name, value in SECTION.items():
            sheet.given(name, value)
    units = {"I_g": "mm4", "d_x": "mm", "delta_L": "mm", "M_s": "kN.m"}
    with sheet.part("beam", "Span 1"):
        for line in lines:
            own = units.get(line.partition(" ")[0], unit)
            numbers = {"1.0": "MPa^0.5"} if "1.0*sqrt" in line else {}
            sheet.line(formula(line, unit=own, numbers=numbers, title="own"))
    graph = Graph(sheet.close())
    beside = ("d_x", "delta_L", "M_s")  # bring quantities into the part
    symbols = [line.partition(" ")[0] for line in lines]
    asked = f"beam/{[symbol for symbol in symbols if symbol not in beside][-1]}"
    assert says in find_slips(graph, asked, {}, typed(graph, asked, text))[0].sentence


def test_the_modulus_of_rupture_in_psi() -> None:
    """7.5 sqrt(f'c) in psi; 1 psi = 0.006894757 MPa, so that it is 7.5 x 0.0830347 = 0.62276."""
    others = of_constant("f_r", "0.6", is_load=False)
    assert any(other.value == pytest.approx(0.62276, abs=5e-5) for other in others)


def test_steel_by_a_lever_arm_of_nine_tenths() -> None:
    """M_f 200: 200e6/(0.85 x 400 x 0.9 x 540) = 200e6/165 240 = 1210.4; right is 1145.0.

    0.805 x 0.65 x 30 x 400 x 62/340 = 6279 x 62/340 = 1145.0.
    """
    sheet = Sheet("H3", "Short cuts")
    with sheet.part("given", "Given"):
        for name, value in GIVENS.items():
            if name not in ("M_f", "d"):
                sheet.given(name, value)
    with sheet.part("beam", "Span 1"):
        sheet.given("M_f", "200 kN.m")
        sheet.given("d", "540 mm")
        sheet.line("A_sr = alpha_1*phi_c*f_c*b*a_r/(phi_s*f_y)", unit="mm2")
    graph = Graph(sheet.close())
    claim = typed(graph, "beam/A_sr", "1210.4")
    found = find_slips(graph, "beam/A_sr", {}, claim, dict.fromkeys(graph.nodes, ""))
    assert "M_f/(phi_s*f_y*0.9*d), a lever arm of 0.9d" in found[0].sentence


def test_a_short_cut_is_not_told_where_the_quantities_are_not_about() -> None:
    """The face of a support has M_sn, V_sn and x_f; a moment in a span has no third of a width."""
    found = slips("sag-1", "M_f = V_sn*x_f - w_f*x_f**2/2", "kN.m", "327.12")
    assert all("V*b/3" not in slip.sentence for slip in found)
