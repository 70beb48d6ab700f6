"""The independent hand checks nos. 1 to 7 and 14: hand calculations on inputs of their own.

Base beam unless noted: b = b_w = 350, h = 600, d = 535, A_s = 2000 (4-25M), f'c = 35, f_y = 400,
lambda = 1, cover 40, 10M stirrups. The others stand in test_independent_beam_checks.py.
"""

from __future__ import annotations

import pytest

from lineproof.formula import Formula
from lineproof.standards.a23_3 import (
    compression_steel,
    crack_control,
    flange,
    flexure,
    materials,
    minimum,
    strain,
    stress_block,
)
from lineproof.standards.nbc.combinations import CASES, factored

from .calculator import value

FACTORS: dict[str, float] = {"phi_c": 0.65, "phi_s": 0.85, "f_c": 35, "f_y": 400, "alpha_1": 0.7975,
           "beta_1": 0.8825, "eps_cu": 0.0035, "E_s": 200000}  # fmt: skip
STEEL = strain.Steel(200000, 400, 0.85)
BLOCK = 0.7975 * 0.65 * 35


def test_no_1_materials() -> None:
    """E_c by 8.6.2.2 and 8.6.2.3, f_r, alpha_1, beta_1: 27 289, 26 622, 3.550, 0.7975, 0.8825."""
    x: dict[str, float] = {"f_c": 35, "gamma_c": 2350, "lambda_": 1}
    assert value(materials.E_C_GENERAL, x) == pytest.approx(27289, abs=0.5)
    assert value(materials.E_C_NORMAL, x) == pytest.approx(26622, abs=0.5)
    assert value(materials.F_R, x) == pytest.approx(3.550, abs=0.0005)
    assert value(stress_block.ALPHA_1, x) == pytest.approx(0.7975, abs=1e-12)
    assert value(stress_block.BETA_1, x) == pytest.approx(0.8825, abs=1e-12)


@pytest.mark.parametrize(
    ("case", "companion", "expected"),
    [
        (1, "", 17.36),  # 1.4 x 12.4
        (2, "S", 35.50),  # 1.25 x 12.4 + 1.5 x 9.0 + 1.0 x 6.5
        (3, "L", 34.25),  # 1.25 x 12.4 + 1.5 x 6.5 + 1.0 x 9.0
        (2, "", 29.00),  # companion = 0: 15.5 + 13.5
        (3, "", 25.25),  # companion = 0: 15.5 + 9.75
    ],
)
def test_no_2_combinations(case: int, companion: str, expected: float) -> None:
    """D 12.4, L 9.0, S 6.5 kN/m: cases 1, 2 and 3 are 17.36, 35.50, 34.25 kN/m (36: see no. 2)."""
    made = factored(CASES[case - 1], "w_f", companion=companion)
    loads = {"w_D": 12.4, "w_L": 9.0, "w_S": 6.5}
    assert value(made, loads) == pytest.approx(expected, abs=1e-9)


def test_no_2_factors_of_the_table() -> None:
    """NBC Table 4.1.3.2.-A as printed (NBC 2020; same in the NBC 2015 format)."""
    wind = {"w_D": 10.0, "w_L": 8.0, "w_S": 4.0, "w_W": 5.0, "w_E": 3.0}
    # 0.9 x 10 + 1.4 x 5 = 16: dead load counteracts, no companion
    assert value(factored(CASES[3], "w_f", dead=1), wind) == pytest.approx(16.0)
    # 1.25 x 10 + 1.4 x 5 + 0.5 x 8 = 23.5; + 0.5 x 4 = 21.5
    assert value(factored(CASES[3], "w_f", companion="L"), wind) == pytest.approx(23.5)
    assert value(factored(CASES[3], "w_f", companion="S"), wind) == pytest.approx(21.5)
    # 1.25 x 10 + 1.5 x 8 + 0.4 x 5 = 26.5
    assert value(factored(CASES[1], "w_f", companion="W"), wind) == pytest.approx(26.5)
    # 1.0 x 10 + 1.0 x 3 + 0.5 x 8 = 17; + 0.25 x 4 = 14
    assert value(factored(CASES[4], "w_f", companion="L"), wind) == pytest.approx(17.0)
    assert value(factored(CASES[4], "w_f", companion="S"), wind) == pytest.approx(14.0)
    extra = {c.number: [k.storage_extra for k in c.companions if k.load == "L"] for c in CASES}
    assert extra == {1: [], 2: [], 3: ["0.5"], 4: ["0.5"], 5: ["0.5"]}


def test_no_4_flange_widths() -> None:
    """Span 9000, h_f 130, clear 2600: T continuous 2150, T simple 2950, L 1100 mm."""
    x: dict[str, float] = {"l": 9000, "h_f": 130, "l_w": 2600, "b_w": 350}
    for overhang, width, expected in (
        (flange.OVERHANG_T_CONTINUOUS, flange.WIDTH_T, 2150),
        (flange.OVERHANG_T_SIMPLE, flange.WIDTH_T, 2950),
        (flange.OVERHANG_L, flange.WIDTH_L, 1100),
    ):
        x["b_o"] = value(overhang, x)
        assert value(width, x) == pytest.approx(expected)


def test_no_5a_rectangular() -> None:
    """a 107.1, c 121.3, c/d 0.227, M_r 327.4 kN.m; rho_b 0.02997; both paths."""
    x: dict[str, float] = FACTORS | {"b": 350, "d": 535, "A_s": 2000}
    x["a"] = value(flexure.BLOCK_RECTANGULAR, x)
    assert x["a"] == pytest.approx(107.1, abs=0.05)
    x["c"] = value(flexure.NEUTRAL_AXIS, x)
    assert x["c"] == pytest.approx(121.3, abs=0.05)
    assert x["c"] / x["d"] == pytest.approx(0.227, abs=0.0005)
    M_r = value(flexure.M_R_RECTANGULAR, x)
    assert M_r / 1e6 == pytest.approx(327.4, abs=0.05)
    by_layers = _by_layers(strain.Section(350, 350, 600), [strain.Layer(535, 2000)])
    assert by_layers == pytest.approx((x["c"], M_r), rel=1e-5)
    x["c_b"] = value(stress_block.C_BALANCED, x)
    x["a_b"] = value(stress_block.A_BALANCED, x)
    x["C_b"] = value(stress_block.C_BALANCED_RECTANGULAR, x)
    rho_b = value(stress_block.A_S_BALANCED, x) / (350 * 535)
    assert rho_b == pytest.approx(0.02997, abs=0.000005)


def test_no_5b_tee() -> None:
    """b 900, h_f 100, b_w 300, d 600, A_s 7000: C_f 1088.6, a 237.3, c/d 0.448, M_r 1220.4."""
    x: dict[str, float] = FACTORS | {"b": 900, "b_w": 300, "h_f": 100, "d": 600, "A_s": 7000}
    assert value(flexure.BLOCK_RECTANGULAR, x) > 100  # leaves the flange
    x["C_f"] = value(flexure.FLANGE_FORCE, x)
    assert x["C_f"] / 1e3 == pytest.approx(1088.6, abs=0.05)
    x["a_w"] = value(flexure.BLOCK_IN_WEB, x)
    assert x["a_w"] == pytest.approx(237.3, abs=0.05)
    c = value(flexure.NEUTRAL_AXIS_IN_WEB, x)
    assert c / 600 == pytest.approx(0.448, abs=0.0005)
    M_r = value(flexure.M_R_TEE, x)
    assert M_r / 1e6 == pytest.approx(1220.4, abs=0.05)
    by_layers = _by_layers(strain.Section(900, 300, 100), [strain.Layer(600, 7000)])
    assert by_layers == pytest.approx((c, M_r), rel=1e-5)


@pytest.mark.parametrize(
    ("displaced", "force", "c", "f_sp", "M_r"),
    [
        (BLOCK, compression_steel.FORCE, 145.3, 400.0, 445.3),
        (0.0, compression_steel.FORCE_GROSS, 142.4, 395.2, 446.2),
    ],
)
def test_no_5c_doubly(displaced: float, force: Formula, c: float, f_sp: float, M_r: float) -> None:
    """b 300, d 500, d' 62, A_s 3000, A'_s 1000: displaced concrete counted, and not."""
    x: dict[str, float] = FACTORS | {"b": 300, "d": 500, "d_p": 62, "A_s": 3000, "A_sp": 1000}
    section, layers = (
        strain.Section(300, 300, 600),
        [strain.Layer(500, 3000), strain.Layer(62, 1000)],
    )
    x["c"], by_layers = _by_layers(section, layers, displaced)
    assert x["c"] == pytest.approx(c, abs=0.05)
    x["f_sp"] = value(compression_steel.STRESS, x)
    assert x["f_sp"] == pytest.approx(f_sp, abs=0.05)
    x["C_s"] = value(force, x)
    x["a"] = value(compression_steel.BLOCK, x)
    x["C_c"] = value(compression_steel.CONCRETE_FORCE, x)
    found = value(compression_steel.M_R, x)
    assert found / 1e6 == pytest.approx(M_r, abs=0.05)
    assert by_layers == pytest.approx(found, rel=1e-5)
    assert x["C_c"] + x["C_s"] == pytest.approx(value(compression_steel.TENSION, x), rel=1e-6)


def test_no_6_minimum_steel() -> None:
    """A_s,min 621, flange in tension 1553 (b_t 875) and 932 (525); 1.2 M_cr 89.5 kN.m."""
    x: dict[str, float] = {"f_c": 35, "f_y": 400, "h": 600, "b_w": 350, "lambda_": 1}
    for width, b_f, b_t, area in (
        (minimum.WIDTH_WEB, 350, 350, 621),
        (minimum.WIDTH_FLANGE_T, 2950, 875, 1553),
        (minimum.WIDTH_FLANGE_L, 1100, 525, 932),
    ):
        x["b_t"] = value(width, x | {"b_f": b_f})
        assert x["b_t"] == b_t
        assert value(minimum.A_S_MIN, x) == pytest.approx(area, abs=0.5)
    x["I_g"] = value(flange.INERTIA_RECTANGLE, x)
    x["y_b"] = value(flange.CENTROID_RECTANGLE, x)
    x["f_r"] = value(materials.F_R, x)
    assert 1.2 * value(flange.CRACKING_BOTTOM, x) / 1e6 == pytest.approx(89.5, abs=0.05)


def test_no_7_crack_control() -> None:
    """d_c = 40 + 11.3 + 12.6 = 63.9, A = 2 x 63.9 x 350/4 = 11 183, f_s 240: z = 21 456 N/mm."""
    x: dict[str, float] = {
        "c_c": 40,
        "d_bs": 11.3,
        "d_b": 25.2,
        "h": 600,
        "d": 536.1,
        "b_w": 350,
        "A_s": 2000,
    }
    x |= {"A_b": 500, "f_y": 400}
    x["f_s"] = value(crack_control.STRESS_ALLOWANCE, x)
    x["d_c"] = value(crack_control.D_C, x)
    x["d_s"] = value(crack_control.D_S, x)
    x["n_z"] = value(crack_control.BAR_COUNT, x)
    x["A_e"] = value(crack_control.TENSION_AREA, x)
    assert x["d_c"] == pytest.approx(63.9)
    assert x["A_e"] == pytest.approx(11183, abs=1)
    assert value(crack_control.Z, x) == pytest.approx(21456, abs=1)


def test_no_14_skin_steel() -> None:
    """h 900, d 815, side cover 40 + 10M + 15M: strips 280 x 118.6 per side, 531 mm2 in all."""
    x: dict[str, float] = {
        "h": 900,
        "d": 815,
        "c_c": 40,
        "d_bs": 11.3,
        "d_b": 16,
        "b_w": 350,
        "rho_sk": 0.008,
    }
    x["d_sk"] = value(crack_control.SKIN_DEPTH, x)
    x["h_sk"] = value(crack_control.SKIN_HEIGHT, x)
    x["b_sk"] = value(crack_control.SKIN_WIDTH, x)
    assert x["h_sk"] == pytest.approx(280)
    assert x["b_sk"] == pytest.approx(118.6)
    x["A_cs"] = value(crack_control.SKIN_STRIPS, x)
    assert value(crack_control.SKIN_AREA, x) == pytest.approx(531, abs=0.5)


def test_minimum_of_the_gallery_beam_flange_in_tension() -> None:
    """Hand: b_t = 2.5 x 380 = 950; 0.2 sqrt(32) x 950 x 620/400 = 1666 mm2."""
    x: dict[str, float] = {"b_f": 3100.0, "b_w": 380.0, "f_c": 32.0, "h": 620.0, "f_y": 400.0}
    x["b_t"] = value(minimum.WIDTH_FLANGE_T, x)
    assert value(minimum.A_S_MIN, x) == pytest.approx(1666, abs=0.5)


def _by_layers(
    section: strain.Section, layers: list[strain.Layer], displaced: float = BLOCK
) -> tuple[float, float]:
    strips = strain.block_strips(section, BLOCK, 0.8825)
    c = strain.neutral_axis(strips, layers, STEEL, 0.0035, displaced)
    return c, strain.moment(strips, layers, STEEL, 0.0035, c, displaced)
