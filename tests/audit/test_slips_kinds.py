"""Each kind of slip by an example: the claim is worked out here, with the slip, by arithmetic."""

from __future__ import annotations

import math

import pytest
from tests.audit.slip_sheet import slips

T = 0.85 * 2000 * 400
"""Tension in the bars, N."""
BLOCK = 0.805 * 0.65 * 30
"""Stress of the block, MPa; the block is T/(BLOCK*1500) deep."""
A = T / (BLOCK * 1500)
D = 600 - 40 - 11.3 - 25.2 / 2
COT = 1 / math.tan(math.radians(35))
V_S = 0.85 * 200 * 400 * 480 * COT / 250 / 1e3
V_C = 0.65 * 0.85 * 0.18 * math.sqrt(30) * 350 * 480 / 1e3
W_F = 1.25 * 12 + 1.5 * 15
V_SN = W_F * 8 / 2 - 227.2 / 8

CASES = [
    ("factor left out", "sag-1/a", A / 0.85, "phi_s"),
    ("factor left out", "shear-1-left/V_c", V_C / 0.85, "lambda_"),
    ("factor left out", "sag-1/a", A * 0.805, "alpha_1"),
    ("factor doubled", "shear-1-left/V_c", V_C * 0.65, "phi_c"),
    ("term left out", "sag-1/d", D + 11.3, "d_bs"),
    ("term counted twice", "loads/w_f", W_F + 1.5 * 15, "1.5*w_L1"),
    ("multiplied for divided", "shear-1-left/V_s", V_S * 250**2, "s ("),
    ("other quantity", "sag-1/M_r", T * (600 - A / 2) / 1e6, "h (1.3, given h) = 600 mm"),
    ("other quantity", "sag-1/a", T / (BLOCK * 350), "b_w (1.4, given b_w) = 350 mm"),
    ("radius or diameter", "sag-1/d", 600 - 40 - 11.3 - 25.2, "2 left out"),
    ("radius or diameter", "sag-1/d", 600 - 40 - 11.3 / 2 - 25.2 / 2, "d_bs"),
    ("bar count changed but not the area", "sag-1/A_s", 3 * 500,
     "n_1 (1.20, given n_1) = 3 in place of 4 bars"),
    ("bar count changed but not the area", "sag-1/M_r",
     0.85 * 2500 * 400 * (D - A / 2) / 1e6, "with 5 bars for 4"),
    ("stirrup legs", "shear-1-left/V_s", V_S / 2, "half of the legs"),
    ("other quantity", "shear-1-left/V_s", V_S / 2, "A_v"),
    ("root or square forgotten", "shear-1-left/V_c", V_C * math.sqrt(30), "root of f_c"),
    ("root or square forgotten", "sag-1/I_g", 350 * 600**2 / 12, "h"),
    ("root or square forgotten", "metres/M_o", W_F * 6 / 8, "power 1 of l_2"),
    ("factor doubled", "metres/M_o", W_F**2 * 6**2 / 8, "w_f"),
    ("sign", "sag-1/d", 600 + 40 - 11.3 - 25.2 / 2, "c_c"),
    ("sign", "hog-2-left/M_f", -300 + 180 * 0.2 - W_F * 0.2**2 / 2, "sign"),
    ("unit factor", "sag-1/M_f", (V_SN**2 / W_F - V_SN**2 / (2 * W_F)) * 1e3,
     "the result in N·mm taken as N·m"),
    ("unit factor", "sag-1/d", 600 - 40 - 1.13 - 25.2 / 2, "in cm taken as mm"),
    ("unit factor", "sag-1/M_r", T * (D / 25.4 - A / 2) / 1e6, "in inches taken as mm"),
    ("degrees for radians", "shear-1-left/V_s", V_S / COT / math.tan(35), "theta"),
    ("load factor", "loads/w_f", 1.25 * 12 + 15, "1.5 left out"),
    ("load factor", "loads/w_s", 1.25 * (12 + 15), "factored by 1.25"),
    ("factored for service", "loads/w_f", 12 + 15, "every load factor left out"),
    ("factored for service", "loads/w_s", W_F, "w_f (2.4"),
    ("half or full tributary width", "loads/w_L1", 5 * 1.5, "b_tr"),
    ("half or full tributary width", "loads/b_tr", 6, "full for half"),
    ("clear for centre span", "sag-1/V_sn", W_F * 7.6 / 2 - 227.2 / 7.6, "l_n"),
    ("simple span for continuous", "sag-1/M_f", W_F * 8**2 / 8, "w_f*l_1**2/8"),
    ("coefficient in place of the analysis", "sag-1/M_f", W_F * 7.6**2 / 14, "w_f*l_n**2/14"),
    ("centreline for face", "hog-2-left/M_f", 300, "support axis"),
    ("left for right, or neighbouring place", "shear-1-left/V_s", V_S * 250 / 300,
     "s (8.1, s of shear-1-right) = 300 mm"),
    ("left for right, or neighbouring place", "hog-2-left/M_f",
     280 - 180 * 0.2 + W_F * 0.2**2 / 2, "M_sn of hog-2-right"),
    ("left for right, or neighbouring place", "sag-1/V_sn", W_F * 6 / 2 - 227.2 / 6, "l_2"),
    ("left for right, or neighbouring place", "hog-2-left/M_f",
     280 - 150 * 0.2 + W_F * 0.2**2 / 2, "written in this row"),
    ("value of another place", "sag-1/M_f",
     280 - 150 * 0.2 + W_F * 0.2**2 / 2, "M_f (6.4, line of M_f)"),
    ("neighbouring row copied", "sag-1/A_s", 0.2 * math.sqrt(30) * 350 * 600 / 400, "A_smin"),
    ("constant of another edition or standard", "sag-1/a", A * 0.9 / 0.85,
     "= 0.9 (member factor of ACI 318M) in place of 0.85"),
    ("constant of another edition or standard", "sag-1/a", A * 0.805 / 0.85, "ACI"),
    ("constant of another edition or standard", "sag-1/A_smin",
     0.25 * math.sqrt(30) * 350 * 600 / 400, "ACI"),
    ("constant of another edition or standard", "loads/w_f",
     1.2 * 12 + 1.6 * 15, "factors 1.2 and 1.6 (ACI 318M) in place of 1.25 and 1.5"),
    ("constant of another edition or standard", "loads/w_f",
     1.4 * 12 + 1.7 * 15, "factors 1.4 and 1.7 (ACI 318 before 2002)"),
    ("constant of another edition or standard", "loads/w_f", 1.35 * 12 + 1.5 * 15, "Eurocode 2"),
    ("constant of another edition or standard", "materials/E_c", 4700 * math.sqrt(30), "4700"),
    # 57 000 sqrt(30/0.00689476) psi = 57 000 x 65.96 = 3.760e6 psi = 25 923 MPa
    ("constant of another edition or standard", "materials/E_c",
     57_000 * math.sqrt(30 / 0.00689476) * 0.00689476, "57 000 in psi"),
    ("constant of another edition or standard", "materials/c_d", 600 / 1000, "strain 0.003"),
    ("branch of min or max forgotten", "sag-1/b_o", 12 * 150, "largest"),
    ("min for max", "sag-1/b_o", 12 * 150, "the largest of the values in place of the least"),
    ("brackets misplaced", "span-1/A_g", 350 * 600 + 1500 - 350 * 150, "b_f - b_w"),
    ("other bar size", "sag-1/d", 600 - 40 - 11.3 - 29.9 / 2, "30M"),
    ("other strength", "sag-1/a", T / (0.805 * 0.65 * 35 * 1500), "f_c"),
    ("transposed digits", "sag-1/V_sn", 211.6, "the result 121.6 written as 211.6"),
    ("transposed digits", "sag-1/a", T / (BLOCK * 5100), "typed as 5100 in place of 1500"),
    ("mistyped digit", "sag-1/V_sn", 421.6, "the result 121.6 written as 421.6"),
    ("mistyped digit", "sag-1/d", 600 - 48 - 11.3 - 25.2 / 2, "typed as 48 in place of 40"),
    ("decimal point", "sag-1/V_sn", 12.16, "decimal point of the result moved by one place"),
]  # fmt: skip


@pytest.mark.parametrize(("kind", "entry_id", "value", "said"), CASES)
def test_slip_is_named_first(kind: str, entry_id: str, value: float, said: str) -> None:
    found = slips(entry_id, value)

    assert found, "no slip fits"
    assert kind in (found[0].kind, *found[0].also), found
    assert said in found[0].sentence, found
