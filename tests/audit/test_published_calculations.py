"""Published hand calculations, claimed as their books print them: none is called wrong.

Sources: A1, A2: Cement Association of Canada, Concrete Design Handbook, 3rd ed. (2006), Chapter 2,
Examples 2.1 and 2.2 (text opened). B1: Nilson, Darwin & Dolan, Design of Concrete Structures,
capacity of a given T beam; B2, C1, J2: McCormac & Brown, Design of Reinforced Concrete, Examples
5.1, 5.7 and 6.1, figures from memory. B1 to J2 are to ACI 318 in US units: own lines, with that
standard's constants as givens.
"""

from __future__ import annotations

from collections.abc import Mapping

import pytest

from lineproof.audit.claims.judge import judge
from lineproof.audit.data import Claim, Judged, Verdict, read_from
from lineproof.audit.graph import Graph
from lineproof.audit.slips.search import find_slips
from lineproof.quantity.units import internal_factor
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import flange, flexure, materials, minimum, stress_block

Printed = Mapping[str, tuple[str, str]]
"""By symbol the number and the unit that the book prints."""


def judged(sheet: Sheet, printed: Printed) -> dict[str, Judged]:
    """Return by symbol what is said of the printed numbers."""
    graph = Graph(sheet.close())
    claims = []
    for symbol, (text, unit) in printed.items():
        factor = internal_factor(unit)
        stands_for = read_from(text).times(factor)
        claims.append(Claim(f"work/{symbol}", text, unit, float(text) * factor, stands_for))
    said = {j.id.partition("/")[2]: j for j in judge(graph, claims, find_slips)}
    return {symbol: said[symbol] for symbol in printed}


def verdicts(said: Mapping[str, Judged]) -> dict[str, Verdict]:
    """Return by symbol the verdict."""
    return {symbol: found.verdict for symbol, found in said.items()}


def a1() -> Sheet:
    """4-20M in 400 by 600, f'c 30: the right block, M_r = 206.7 kN.m."""
    sheet = Sheet("A1")
    with sheet.part("work", "Example 2.1"):
        for symbol, typed in {
            "b": "400 mm", "h": "600 mm", "c_c": "40 mm", "d_bs": "11.3 mm", "d_b": "19.5 mm",
            "A_s": "1200 mm2", "f_c": "30 MPa", "f_y": "400 MPa", "phi_c": "0.65", "phi_s": "0.85",
        }.items():  # fmt: skip
            sheet.given(symbol, typed)
        sheet.line("d = h - c_c - d_bs - d_b/2", unit="mm", title="Effective depth")
        sheet.line("rho_s = A_s/(b*d)", unit="", title="Ratio of reinforcement")
        for made in (
            stress_block.ALPHA_1, stress_block.BETA_1, flexure.BLOCK_RECTANGULAR,
            flexure.M_R_RECTANGULAR,
        ):  # fmt: skip
            sheet.line(made)
        sheet.line("K_r = M_r/(b*d**2)", unit="MPa", title="Factor of the resistance")
    return sheet


A1_PRINTED = {
    "d": ("539", "mm"),
    "rho_s": ("0.0056", ""),
    "K_r": ("1.8", "MPa"),
    "M_r": ("209", "kN.m"),
}


def test_a1_a_factor_read_from_a_table_is_another_valid_way() -> None:
    """K_r = 1.8 from the table gives 1.8 x 400 x 539^2 = 209.2 kN.m; exact 1.778 and 206.7."""
    said = judged(a1(), A1_PRINTED)

    # 206.7 with d rounded to 539; the record keeps 538.95
    assert said["M_r"].right == pytest.approx(206.7e6, abs=0.1e6)
    assert verdicts(said) == {
        "d": Verdict.AGREES,
        "rho_s": Verdict.AGREES,
        "K_r": Verdict.AGREES,
        "M_r": Verdict.OTHER_METHOD,
    }
    assert "1.8" in said["M_r"].note


def test_a1_without_the_factor_written_down() -> None:
    """Only the inputs, d and M_r = 209 claimed, as in a quick table."""
    said = judged(a1(), {symbol: A1_PRINTED[symbol] for symbol in ("d", "M_r")})

    assert verdicts(said) == {"d": Verdict.AGREES, "M_r": Verdict.OTHER_METHOD}


def test_a1_a_slip_of_the_same_size_is_still_found() -> None:
    """With h for d: 0.85 x 1200 x 400 x (600 - 65/2) = 231.6 kN.m is no value of a table."""
    said = judged(a1(), A1_PRINTED | {"M_r": ("232", "kN.m")})

    assert said["M_r"].verdict is Verdict.ORIGIN
    assert "h" in said["M_r"].slips[0].sentence


def test_a2_design_cracking_and_minimum_reinforcement() -> None:
    """rho = 0.0113 from a table: 0.0113 x 400 x 546 = 2468 mm2, within what d = 546 stands for."""
    sheet = Sheet("A2")
    with sheet.part("work", "Example 2.2"):
        for symbol, typed in {
            "b": "400 mm", "b_w": "400 mm", "b_t": "400 mm", "h": "600 mm", "c_c": "30 mm",
            "d_bs": "11.3 mm", "d_b": "25.2 mm", "f_c": "40 MPa", "f_y": "400 MPa",
            "phi_c": "0.65", "phi_s": "0.85", "lambda_": "1.0", "M_f": "415 kN.m",
        }.items():  # fmt: skip
            sheet.given(symbol, typed)
        sheet.line("d = h - c_c - d_bs - d_b/2", unit="mm", title="Effective depth")
        sheet.line("K_f = M_f/(b*d**2)", unit="MPa", title="Factor of the moment")
        for made in (
            stress_block.ALPHA_1, flexure.BLOCK_REQUIRED, flexure.A_S_REQUIRED,
            flange.INERTIA_RECTANGLE, flange.CENTROID_RECTANGLE, materials.F_R,
            flange.CRACKING_BOTTOM,
        ):  # fmt: skip
            sheet.line(made)
        sheet.line("M_cm = 1.2*M_cr", unit="kN.m", title="Moment to be resisted at least")
        sheet.line(minimum.A_S_MIN)
    said = judged(
        sheet,
        {
            "d": ("546", "mm"),
            "K_f": ("3.48", "MPa"),
            "A_sr": ("2468", "mm2"),
            "I_g": ("7200000000", "mm4"),
            "M_cr": ("91", "kN.m"),
            "M_cm": ("109", "kN.m"),
            "A_smin": ("759", "mm2"),
        },
    )

    assert set(verdicts(said).values()) == {Verdict.AGREES}


def us(name: str, givens: Mapping[str, str], lines: Mapping[str, str]) -> Sheet:
    """Return a calculation in US units: givens as typed, lines with their printed unit."""
    sheet = Sheet(name)
    with sheet.part("work", f"Example {name}"):
        for symbol, typed in givens.items():
            sheet.given(symbol, typed, "as the book gives it")
        for text, unit in lines.items():
            sheet.line(text, unit=unit, title="own line")
    return sheet


ACI = {"alpha_1": "0.85", "beta_1": "0.85", "phi_m": "0.9"}


def test_b1_block_in_the_web() -> None:
    """(7.62 - 4.59) x 60/(0.85 x 3 x 10) = 7.13 in; 0.9 of 10413 in-kip is 9371, printed 9370."""
    sheet = us(
        "B1",
        ACI | {
            "b_f": "28 in", "h_f": "6 in", "b_w": "10 in", "d": "26 in", "A_s": "7.62 in2",
            "f_c": "3 ksi", "f_y": "60 ksi",
        },
        {
            "a_1 = A_s*f_y/(alpha_1*f_c*b_f)": "mm",
            "A_sf = alpha_1*f_c*(b_f - b_w)*h_f/f_y": "mm2",
            "a_2 = (A_s - A_sf)*f_y/(alpha_1*f_c*b_w)": "mm",
            "M_u = phi_m*(A_sf*f_y*(d - h_f/2) + (A_s - A_sf)*f_y*(d - a_2/2))": "kN.m",
        },
    )  # fmt: skip
    said = judged(
        sheet,
        {
            "a_1": ("6.4", "in"),
            "A_sf": ("4.59", "in2"),
            "a_2": ("7.13", "in"),
            "M_u": ("9370", "kip.in"),
        },
    )

    assert set(verdicts(said).values()) == {Verdict.AGREES}


def test_b2_block_in_the_flange() -> None:
    """360/(0.85 x 4) = 105.88 in2; a 1.76 in, c 2.08 in, z 23.12 in; 0.9 x 360 x 23.12 = 7490."""
    sheet = us(
        "B2",
        ACI | {"b_f": "60 in", "d": "24 in", "A_s": "6 in2", "f_c": "4 ksi", "f_y": "60 ksi"},
        {
            "T_n = A_s*f_y": "kN",
            "A_k = T_n/(alpha_1*f_c)": "mm2",
            "a_1 = A_k/b_f": "mm",
            "c_1 = a_1/beta_1": "mm",
            "z_1 = d - a_1/2": "mm",
            "M_u = phi_m*T_n*z_1": "kN.m",
        },
    )  # fmt: skip
    said = judged(
        sheet,
        {
            "T_n": ("360", "kip"),
            "A_k": ("105.88", "in2"),
            "a_1": ("1.76", "in"),
            "c_1": ("2.08", "in"),
            "z_1": ("23.12", "in"),
            "M_u": ("7490", "kip.in"),
        },
    )

    assert set(verdicts(said).values()) == {Verdict.AGREES}


def test_c1_compression_steel_yields() -> None:
    """(6.25 - 2) x 60/(0.85 x 3 x 14 x 0.85) = 8.40 in; strains 0.00211 and 0.00557; 7010."""
    sheet = us(
        "C1",
        ACI | {
            "b": "14 in", "d": "24 in", "d_p": "2.5 in", "A_s": "6.25 in2", "A_sp": "2 in2",
            "f_c": "3 ksi", "f_y": "60 ksi", "eps_cu": "0.003",
        },
        {
            "c = (A_s - A_sp)*f_y/(alpha_1*f_c*b*beta_1)": "mm",
            "a = beta_1*c": "mm",
            "eps_sp = eps_cu*(c - d_p)/c": "",
            "eps_t = eps_cu*(d - c)/c": "",
            "M_u = phi_m*(alpha_1*f_c*b*a*(d - a/2) + A_sp*f_y*(d - d_p))": "kN.m",
        },
    )  # fmt: skip
    said = judged(
        sheet,
        {
            "c": ("8.4", "in"),
            "a": ("7.14", "in"),
            "eps_sp": ("0.00211", ""),
            "eps_t": ("0.00557", ""),
            "M_u": ("7010", "kip.in"),
        },
    )

    assert set(verdicts(said).values()) == {Verdict.AGREES}


def test_j2_effective_inertia_and_deflection() -> None:
    """7.5 root 3000 = 410.8 psi; M_cr 27.4 ft-kip; I_e 4199 in4; 5 w l^4/(384 E_c I_e) = 0.467."""
    sheet = us(
        "J2",
        {
            "b": "12 in", "h": "20 in", "d": "17 in", "A_s": "3 in2", "E_c": "3120 ksi", "n_E": "9",
            "f_r": "410.8 psi", "l": "20 ft", "w_D": "1 klf", "w_L": "0.7 klf",
        },
        {
            "I_g = b*h**3/12": "mm4",
            "M_cr = f_r*I_g/(h/2)": "kN.m",
            "kd = n_E*A_s/b*(sqrt(1 + 2*b*d/(n_E*A_s)) - 1)": "mm",
            "I_cr = b*kd**3/3 + n_E*A_s*(d - kd)**2": "mm4",
            "M_a = (w_D + w_L)*l**2/8": "kN.m",
            "I_e = (M_cr/M_a)**3*I_g + (1 - (M_cr/M_a)**3)*I_cr": "mm4",
            "delta_DL = 5*(w_D + w_L)*l**4/(384*E_c*I_e)": "mm",
        },
    )  # fmt: skip
    said = judged(
        sheet,
        {
            "I_g": ("8000", "in4"),
            "M_cr": ("27.4", "kip.ft"),
            "kd": ("6.78", "in"),
            "I_cr": ("4067", "in4"),
            "M_a": ("85", "kip.ft"),
            "I_e": ("4199", "in4"),
            "delta_DL": ("0.467", "in"),
        },
    )

    assert set(verdicts(said).values()) == {Verdict.AGREES}
