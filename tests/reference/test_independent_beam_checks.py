"""The independent hand checks nos. 2 (service), 3, 8 to 13 and 15: each as one chain of formulas.

Base beam unless noted: b = b_w = 350, h = 600, d = 535, A_s = 2000 (4-25M), f'c = 35, f_y = 400,
lambda = 1, cover 40, 10M stirrups (A_v = 200) at 225.
"""

from __future__ import annotations

import pytest

from lineproof.formula import Formula
from lineproof.standards.a23_3 import (
    analysis,
    cutoff,
    deflection,
    development,
    flange,
    hooks,
    interface,
    laps,
    materials,
    shear,
    shear_bars,
    shear_factors,
    torsion,
)
from lineproof.standards.nbc import reduction
from lineproof.standards.nbc.combinations import SERVICE_CASES, specified

from .calculator import value

BASE: dict[str, float] = {
    "b": 350, "b_w": 350, "h": 600, "d": 535, "A_s": 2000, "f_c": 35, "f_y": 400, "f_yt": 400,
    "lambda_": 1, "phi_c": 0.65, "phi_s": 0.85, "E_s": 200000, "c_c": 40, "d_bs": 11.3,
    "A_v": 200, "s": 225, "d_b": 25.2, "A_b": 500,
}  # fmt: skip


def chain(x: dict[str, float], *formulas: Formula) -> dict[str, float]:
    """Add to the values what each formula gives, one after the other."""
    for made in formulas:
        x[made.symbol] = value(made, x)
    return x


@pytest.mark.parametrize(
    ("case", "companion", "expected"),
    [
        (1, "S", 23.675),  # 12.4 + 9.0 + 0.35 x 6.5, printed 23.68
        (3, "L", 22.05),  # 12.4 + 6.5 + 0.35 x 9.0
        (2, "L", 20.55),  # 12.4 + 5.0 + 0.35 x 9.0, wind 5 kN/m
        (1, "W", 22.9),  # 12.4 + 9.0 + 0.3 x 5.0
    ],
)
def test_no_2_service(case: int, companion: str, expected: float) -> None:
    """D 12.4, L 9.0, S 6.5 kN/m: service cases 1 and 3 give 23.68 and 22.05 kN/m."""
    made = specified(SERVICE_CASES[case - 1], "w_s", companion=companion)
    loads = {"w_D": 12.4, "w_L": 9.0, "w_S": 6.5, "w_W": 5.0}
    assert value(made, loads) == pytest.approx(expected, abs=1e-9)


@pytest.mark.parametrize(
    ("made", "group", "area", "expected"),
    [
        (reduction.FACTOR_OTHER, reduction.OTHER, 54, 0.726),
        (reduction.FACTOR_HEAVY, reduction.HEAVY, 120, 0.908),
    ],
)
def test_no_3_live_load_reduction(made: Formula, group: str, area: float, expected: float) -> None:
    """B = 54 m2: 0.726; A = 120 m2: 0.908."""
    x = {"A_0": reduction.AREAS.number(group, "A_0") * 1e6, "A_L": area * 1e6}
    assert value(made, x) == pytest.approx(expected, abs=5e-4)


def test_no_8_simplified_shear() -> None:
    """V_c 116.6, V_s 207.8, V_r 324.5, V_r,max 958.5 kN; s_max 337; s of the minimum 644 mm."""
    x = BASE | {"beta": 0.18, "theta": 35}
    chain(x, shear.D_V, shear.V_C, shear.V_S, shear.V_R_MAX, shear.V_R, shear.S_MAX)
    chain(x, shear.SPACING_MINIMUM)
    assert x["d_v"] == pytest.approx(481.5)
    assert x["V_c"] / 1e3 == pytest.approx(116.6, abs=0.06)
    assert x["V_s"] / 1e3 == pytest.approx(207.8, abs=0.05)
    assert x["V_r"] / 1e3 == pytest.approx(324.5, abs=0.05)
    assert x["V_rmax"] / 1e3 == pytest.approx(958.5, abs=0.05)
    assert x["s_max"] == pytest.approx(337, abs=0.5)
    assert x["s_v"] == pytest.approx(644, abs=0.5)
    x["V_f"] = 0.0
    limit = shear.CLOSER.functions[1](*[x[name] for name in shear.CLOSER.names])
    assert limit / 1e3 == pytest.approx(479.2, abs=0.06)


def test_no_8b_without_stirrups() -> None:
    """beta 0.1552, V_c 100.6 kN; aggregate 14 mm: s_ze 581.1 mm, beta 0.1455."""
    x = chain(BASE | {"a_max": 14}, shear.D_V, shear_factors.BETA_D_V, shear.V_C)
    assert x["beta"] == pytest.approx(0.1552, abs=5e-5)
    assert x["V_c"] / 1e3 == pytest.approx(100.6, abs=0.05)
    chain(x, shear_factors.A_G, shear_factors.S_Z, shear_factors.S_ZE, shear_factors.BETA_S_ZE)
    assert x["s_ze"] == pytest.approx(581.1, abs=0.05)
    assert x["beta"] == pytest.approx(0.1455, abs=5e-5)


def test_no_9_general_shear() -> None:
    """V_f 260, M_f 160: eps_x 0.740e-3, beta 0.1895, theta 34.18, V_c 122.8, V_s 214.3 kN."""
    x = chain(BASE | {"V_f": 260e3, "M_f": 160e6}, shear.D_V, shear_factors.EPS_X)
    assert x["eps_x"] == pytest.approx(0.740e-3, abs=5e-7)
    chain(x, shear_factors.BETA_STIRRUPS, shear_factors.THETA, shear.V_C, shear.V_S)
    assert x["beta"] == pytest.approx(0.1895, abs=5e-5)
    assert x["theta"] == pytest.approx(34.18, abs=0.005)
    assert x["V_c"] / 1e3 == pytest.approx(122.8, abs=0.05)
    assert x["V_s"] / 1e3 == pytest.approx(214.3, abs=0.05)
    x["s_ze"] = 300.0
    assert value(shear_factors.BETA_GENERAL, x) == pytest.approx(x["beta"], rel=1e-12)


def test_no_9b_longitudinal_bars() -> None:
    """theta 35, V_s 207.8: F_lt 555.2 kN in the span, 222.9 kN (656 mm2) at the end support."""
    x = BASE | {"V_f": 260e3, "M_f": 160e6, "theta": 35}
    chain(x, shear.D_V, shear.V_S, shear_bars.TENSION_SIDE, shear_bars.END_SUPPORT)
    assert x["F_lt"] / 1e3 == pytest.approx(555.2, abs=0.05)
    assert x["F_le"] / 1e3 == pytest.approx(222.9, abs=0.05)
    assert value(shear_bars.AREA_END_SUPPORT, x) == pytest.approx(656, abs=0.5)


def test_no_10_torsion() -> None:
    """T_f 28: T_cr 33.92, A_oh 131 601, p_h 1534.8, A_t/s 0.258, 2.124 <= 5.688, 178.4 kN."""
    x = BASE | {"V_f": 260e3, "T_f": 28e6, "theta": 35, "A_t": 100}
    chain(x, shear.D_V, shear.V_S, torsion.AREA_RECTANGLE, torsion.PERIMETER_RECTANGLE)
    chain(x, torsion.T_CR, torsion.AREA_OF_STIRRUP, torsion.PERIMETER_OF_STIRRUP, torsion.A_O)
    assert x["T_cr"] / 1e6 == pytest.approx(33.92, abs=0.005)
    assert 0.25 * x["T_cr"] / 1e6 == pytest.approx(8.48, abs=0.005)
    assert x["A_oh"] == pytest.approx(131601, abs=0.5)
    assert x["p_h"] == pytest.approx(1534.8)
    assert value(torsion.LEG_FOR_TORSION, x) == pytest.approx(0.258, abs=5e-4)
    left, right = (f(*[x[n] for n in torsion.SECTION.names]) for f in torsion.SECTION.functions)
    assert (left, right) == pytest.approx((2.124, 5.688), abs=6e-4)
    assert value(torsion.SHEAR_IN_BARS, x) / 1e3 == pytest.approx(178.4, abs=0.05)
    # the halved spacing limit of 168 mm, which 225 breaks
    assert value(shear.S_MAX_HALVED, x) == pytest.approx(168.5, abs=0.05)
    # T_r is what the leg required was solved from
    x["a_t"] = value(torsion.LEG_FOR_TORSION, x)
    assert value(torsion.T_R, x | {"s": 100 / x["a_t"]}) == pytest.approx(28e6)


def cracked(x: dict[str, float]) -> dict[str, float]:
    """Add the cracked section and the cracking moment for deflections of the base beam."""
    chain(x, materials.E_C_NORMAL, materials.F_R, flange.INERTIA_RECTANGLE)
    chain(x, flange.CENTROID_RECTANGLE, deflection.F_R_DEFLECTION, deflection.CRACKING_BOTTOM)
    return chain(x, deflection.MODULAR_RATIO, deflection.AXIS, deflection.CRACKED)


def test_no_11_effective_inertia() -> None:
    """I_cr 2572e6, I_g 6300e6, M_a 150: M_cr 37.27, I_e 2630e6; averages 2501e6 and 2535e6."""
    x = cracked(BASE | {"M_a": 150e6})
    assert x["I_cr"] / 1e6 == pytest.approx(2572, abs=0.6)
    assert x["I_g"] == pytest.approx(6300e6)
    assert x["M_crd"] / 1e6 == pytest.approx(37.27, abs=0.005)
    x["I_em"] = value(deflection.EFFECTIVE, x)
    assert x["I_em"] / 1e6 == pytest.approx(2630, abs=0.6)
    x |= {"I_e1": 2000e6, "I_e2": 2400e6, "I_ec": 2000e6}
    assert value(deflection.BOTH_ENDS, x) / 1e6 == pytest.approx(2501, abs=0.6)
    assert value(deflection.ONE_END, x) / 1e6 == pytest.approx(2535, abs=0.6)
    # with the full modulus of rupture, as before A23.3-14
    x["M_crd"] *= 2
    assert value(deflection.EFFECTIVE, x) / 1e6 == pytest.approx(3030, abs=0.6)


def test_no_11b_long_term_deflection() -> None:
    """A'_s 600, 5 years: 2.724 (1.724 more); 7 m, 20 kN/m: I_e 2677e6 mm4, 8.77 mm."""
    x = cracked(BASE | {"A_sp": 600, "S_t": 2, "w_s": 20, "l": 7000})
    chain(x, deflection.COMPRESSION_RATIO, deflection.LONG_TERM, deflection.MOMENT_SIMPLE)
    assert x["zeta_s"] == pytest.approx(2.724, abs=5e-4)
    assert x["M_a"] / 1e6 == pytest.approx(122.5)
    chain(x, deflection.EFFECTIVE, deflection.SIMPLE_SPAN)
    assert x["I_e"] / 1e6 == pytest.approx(2677, abs=0.6)
    assert x["delta_i"] == pytest.approx(8.77, abs=0.005)
    # a simple span by its moments: no end moments, the same deflection
    x |= {"I_ea": x["I_e"], "M_m": x["M_a"], "M_h1": 0, "M_h2": 0}
    assert value(deflection.CONTINUOUS_SPAN, x) == pytest.approx(x["delta_i"], rel=1e-12)


def test_no_12_development() -> None:
    """25M: 767 / top bars 997 / 1022; general 672 (d_cs 49.4, K_tr 8.47), class B 874 mm."""
    x = BASE | {"k_1": 1, "k_2": 1, "k_3": 1, "k_4": 1, "A_tr": 200, "n_d": 4}
    assert value(development.SHORT, x) == pytest.approx(767, abs=0.5)
    assert value(development.SHORT, x | {"k_1": 1.3}) == pytest.approx(997, abs=0.5)
    assert value(development.LONG, x) == pytest.approx(1022, abs=0.5)
    x |= {"d_cn": 63.9, "s_c": (350 - 2 * 63.9) / 3 - 25.2}
    chain(x, development.CENTRES, development.D_CS, development.K_TR, development.GENERAL)
    assert x["d_cs"] == pytest.approx(49.4, abs=0.05)
    assert x["K_tr"] == pytest.approx(8.47, abs=0.005)
    assert value(development.L_D, x) == pytest.approx(672, abs=0.5)
    assert value(laps.CLASS_B, x) == pytest.approx(874, abs=0.5)


def test_no_12b_hooks_and_compression() -> None:
    """25M: hook 426, x 0.7: 298; compression 444, compression lap 736 mm."""
    x = chain(BASE | {"k_hc": 0.7, "k_ht": 1, "k_hd": 1, "k_he": 1}, hooks.BASIC, hooks.L_DH)
    assert x["l_hb"] == pytest.approx(426, abs=0.5)
    assert x["l_dh"] == pytest.approx(298, abs=0.5)
    chain(x, development.COMPRESSION_BASIC, development.COMPRESSION)
    assert x["l_dc"] == pytest.approx(444, abs=0.5)
    assert value(laps.COMPRESSION, x) == pytest.approx(736, abs=0.5)


def test_no_12c_zero_moment() -> None:
    """2-25M continuing, M_r 172.8, V_f 260, l_a 150: 815 without, 1014 mm with confinement."""
    x: dict[str, float] = {"M_r": 172.8e6, "V_f": 260e3, "l_a": 150}
    assert value(cutoff.LIMIT, x) == pytest.approx(815, abs=0.5)
    assert value(cutoff.LIMIT_CONFINED, x) == pytest.approx(1014, abs=0.5)


def test_no_13_interface() -> None:
    """Monolithic, 2-10M at 250 in 130: rho_v 0.00615, sigma 2.46, 2.89 MPa (<= 5.69)."""
    row = interface.SURFACES.rows["monolithic"]
    x = BASE | {"A_vf": 200, "s_f": 250, "h_f": 130} | {k: float(v) for k, v in row.items()}
    chain(x, interface.RATIO_FLANGE, interface.COMPRESSION, interface.RESISTANCE)
    assert x["rho_v"] == pytest.approx(0.00615, abs=5e-6)
    assert x["sigma"] == pytest.approx(2.46, abs=0.005)
    assert x["v_r"] == pytest.approx(2.89, abs=0.005)
    assert value(interface.RESISTANCE, x | {"sigma": 100}) == pytest.approx(5.69, abs=0.005)


def test_no_15_redistribution() -> None:
    """c/d 0.236: 18.2 per cent."""
    made = value(analysis.LARGEST_CHANGE, {"c": 0.236, "d": 1})
    assert made == pytest.approx(18.2, abs=1e-9)
