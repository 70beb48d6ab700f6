"""Worked numbers of the catalogue, part 5: development, hooks, laps, cut-off of bars.

25M bars (25.2 mm, 500 mm2) in the base beam of the independent checks: f'c 35, f_y 400, 10M
stirrups at 225, bars at 74.067 c/c, 63.9 from their centre to the nearest surface.
"""

from __future__ import annotations

from .worked import Worked

W = Worked
CHECK_12 = "hand calculation, independent check no. 12"
GUIDE = "public technical guide of a bar product, l_d to A23.3-14: printed to the next 10 mm"
CASE_H2 = "case H2: formula evaluation from memory, not a printed number"
K = {"k_1": 1.0, "k_2": 1.0, "k_3": 1.0, "k_4": 1.0}
BAR = {"f_y": 400, "f_c": 35, "d_b": 25.2}
DEVELOPMENT = (
    W(
        "development.FRESH_BELOW",
        {"h": 600, "c_c": 40, "d_bs": 11.3, "d_b": 25.2},
        "600 - 40 - 11.3 - 25.2 = 523.5",
    ),
    W("development.CLEAR_OVERHANG", {"b_ot": 380, "n_o": 3, "d_b": 16}, "380/3 - 16 = 110.67"),
    W(
        "development.TO_SURFACE",
        {"c_c": 40, "d_bs": 11.3, "d_b": 25.2},
        "40 + 11.3 + 12.6 = 63.9",
        CHECK_12,
    ),
    W("development.A_TR", {"n_v": 2, "A_bs": 100}, "2*100 = 200", CHECK_12),
    # (350 - 2 x 63.9)/3 = 74.067 c/c: 48.867 clear
    W("development.CENTRES", {"s_c": 48.867, "d_b": 25.2}, "48.867 + 25.2 = 74.067", CHECK_12),
    W(
        "development.D_CS",
        {"d_cn": 63.9, "s_bb": 74.067},
        "min(63.9, 2/3*74.067) = min(63.9, 49.378) = 49.4",
        CHECK_12,
    ),
    W("development.D_CS", {"d_cn": 40, "s_bb": 74.067}, "min(40, 49.378) = 40.0"),
    W(
        "development.K_TR",
        {"A_tr": 200, "f_yt": 400, "s": 225, "n_d": 4},
        "200*400/(10.5*225*4) = 80000/9450 = 8.47",
        CHECK_12,
    ),
    W(
        "development.GENERAL",
        {**BAR, **K, "A_b": 500, "d_cs": 49.378, "K_tr": 8.466},
        "1.15*400*500/((49.378 + 8.466)*sqrt(35)) = 230000/(57.844*5.91608) = 672",
        CHECK_12,
    ),
    # d_cs + K_tr counts up to 2.5 d_b; 25M, f'c 20: 816, printed 820
    W(
        "development.GENERAL",
        {**BAR, **K, "f_c": 20, "A_b": 500, "d_cs": 63, "K_tr": 20},
        "1.15*400*500/(2.5*25.2*sqrt(20)) = 230000/(63*4.472136) = 816",
        GUIDE,
    ),
    # 30M, f'c 30: 786, printed 790
    W(
        "development.GENERAL",
        {**K, "f_y": 400, "f_c": 30, "d_b": 29.9, "A_b": 700, "d_cs": 74.75, "K_tr": 0.001},
        "1.15*400*700/(74.75*sqrt(30)) = 322000/409.4226 = 786",
        GUIDE,
    ),
    # 20M, f'c 25: 453, printed 450
    W(
        "development.GENERAL",
        {**K, "f_y": 400, "f_c": 25, "d_b": 19.5, "A_b": 300, "d_cs": 48.75, "K_tr": 9, "k_4": 0.8},
        "1.15*0.8*400*300/(48.75*5) = 110400/243.75 = 453",
        GUIDE,
    ),
    # epoxy-coated top bars: 1.3 x 1.5 counts as 1.7; sqrt(80) as 8
    W(
        "development.GENERAL",
        {**BAR, **K, "k_1": 1.3, "k_2": 1.5, "f_c": 80, "A_b": 500, "d_cs": 63, "K_tr": 9},
        "1.15*1.7*400*500/(63*8) = 391000/504 = 775.8",
    ),
    W("development.SHORT", {**BAR, **K}, "0.45*400/sqrt(35)*25.2 = 767", CHECK_12),
    W(
        "development.SHORT",
        {**BAR, **K, "k_1": 1.3},
        "0.45*1.3*400/sqrt(35)*25.2 = 997",
        CHECK_12,
    ),
    W("development.LONG", {**BAR, **K}, "0.60*400/sqrt(35)*25.2 = 1022", CHECK_12),
    W("development.L_D", {"l_d0": 672.1}, "max(672.1, 300) = 672", CHECK_12),
    W("development.L_D", {"l_d0": 250}, "max(250, 300) = 300"),
    W(
        "development.L_D_EXCESS",
        {"l_d0": 672.1, "A_sr": 1500, "A_s": 2000},
        "672.1*0.75 = 504.075",
    ),
    W("development.L_D_EXCESS", {"l_d0": 672.1, "A_sr": 2100, "A_s": 2000}, "672.1*1 = 672.1"),
    W("development.L_D_BUNDLE", {"k_bu": 1.2, "l_d0": 672.1}, "1.2*672.1 = 806.52"),
    W(
        "development.DEVELOPED_AREA",
        {"A_s": 1000, "l_av": 400, "l_d": 672},
        "1000*400/672 = 595.2",
    ),
    W("development.DEVELOPED_AREA", {"A_s": 1000, "l_av": 700, "l_d": 672}, "1000*1 = 1000.0"),
    W("development.DEVELOPED_TOTAL", {"A_sd1": 1000, "A_sd2": 595.2}, "1000 + 595.2 = 1595.2"),
    W(
        "development.COMPRESSION_BASIC",
        BAR,
        "max(0.24*25.2*400/sqrt(35), 0.044*25.2*400) = max(408.9, 443.52) = 444",
        CHECK_12 + "b",
    ),
    W(
        "development.COMPRESSION_BASIC",
        {"f_y": 400, "f_c": 25, "d_b": 25.2},
        "max(0.24*25.2*400/5, 443.52) = 483.84",
    ),
    W("development.COMPRESSION", {"l_db": 443.52}, "max(443.52, 200) = 444", CHECK_12 + "b"),
    W("development.COMPRESSION_TIED", {"l_db": 443.52}, "0.75*443.52 = 332.64"),
    W("development.COMPRESSION_TIED", {"l_db": 180}, "max(0.75*180, 200) = 200"),
)
FACTORS = {"k_hc": 1.0, "k_ht": 1.0, "k_hd": 1.0, "k_he": 1.0}
HOOKS = (
    W("hooks.BASIC", BAR, "100*25.2/sqrt(35)*400/400 = 426", CHECK_12 + "b"),
    W("hooks.BASIC", {"f_y": 400, "f_c": 30, "d_b": 16}, "100*16/sqrt(30) = 292", CASE_H2),
    W("hooks.BASIC", {"f_y": 500, "f_c": 80, "d_b": 16}, "100*16/8*500/400 = 250.0"),
    W(
        "hooks.L_DH",
        {**FACTORS, "k_hc": 0.7, "l_hb": 425.96, "d_b": 25.2},
        "max(0.7*425.96, 8*25.2, 150) = max(298.172, 201.6, 150) = 298",
        CHECK_12 + "b",
    ),
    W(
        "hooks.L_DH",
        {**FACTORS, "k_hc": 0.7, "k_ht": 0.8, "l_hb": 220, "d_b": 11.3},
        "max(0.56*220, 8*11.3, 150) = max(123.2, 90.4, 150) = 150",
    ),
    W(
        "hooks.L_DH_EXCESS",
        {**FACTORS, "k_hc": 0.7, "l_hb": 425.96, "d_b": 25.2, "A_sr": 900, "A_s": 1000},
        "0.7*0.9*425.96 = 268.35",
    ),
    # the base beam alone gives 51.3 mm of side cover, a column of 500 mm 75 mm more
    W("hooks.SIDE_COVER", {"c_c": 40, "d_bs": 11.3}, "40 + 11.3 = 51.3", CHECK_12 + "b"),
    W("hooks.FACE_COVER", {"c_c": 40, "d_bs": 11.3}, "40 + 11.3 = 51.3", CHECK_12 + "b"),
    W(
        "hooks.SIDE_COVER_COLUMN",
        {"b_col": 500, "b_w": 350, "c_c": 40, "d_bs": 11.3},
        "150/2 + 40 + 11.3 = 126.3",
    ),
    W("hooks.AVAILABLE", {"b_sp": 400, "c_end": 50}, "400 - 50 = 350.0"),
)
LAPS = (
    W("laps.CLASS_A", {"l_d0": 672.1}, "1.0*672.1 = 672.1"),
    W("laps.CLASS_B", {"l_d0": 672.1}, "1.3*672.1 = 874", CHECK_12),
    # 1.3 times the length before the least of 300 mm: 1.3 x 200, not 1.3 x 300
    W("laps.CLASS_B", {"l_d0": 200}, "max(1.3*200, 300) = 300"),
    W("laps.TWO_SIZES", {"l_sn": 546, "l_dk": 874}, "max(546, 874) = 874"),
    W(
        "laps.TWO_ROWS",
        {"l_sw": 546, "l_dt": 874, "A_s1": 1000, "A_s2": 1250},
        "max(546, 874*0.8) = 699.2",
    ),
    W("laps.CLEAR_CORNERS", {"s_c": 74.1, "d_b": 25.2}, "74.1 - 25.2 = 48.9"),
    W("laps.CLEAR_PAIR", {"s_c": 197, "d_b": 25.2}, "197 - 50.4 = 146.6"),
    W("laps.COMPRESSION", {"f_y": 400, "d_b": 25.2}, "0.073*400*25.2 = 736", CHECK_12 + "b"),
    W("laps.COMPRESSION", {"f_y": 400, "d_b": 10}, "max(292, 300) = 300"),
    W("laps.COMPRESSION_STRONG", {"f_y": 500, "d_b": 25.2}, "(0.133*500 - 24)*25.2 = 1071.0"),
)
CUTOFF = (
    W(
        "cutoff.EXTENSION",
        {"d": 535, "d_b": 25.2, "d_v": 481.5, "theta": 35},
        "max(535, 12*25.2, 481.5*cot(35)) = max(535, 302.4, 687.65) = 687.7",
    ),
    W("cutoff.EXTENSION_PLAIN", {"d": 535, "d_b": 25.2}, "max(535, 302.4) = 535"),
    W("cutoff.EXTENSION_PLAIN", {"d": 250, "d_b": 25.2}, "max(250, 12*25.2) = 302.4"),
    W(
        "cutoff.TENSION_OTHER_SIDE",
        {"M_f": 48.15, "d_v": 481.5, "V_f": 260, "V_s": 207.8, "theta": 35},
        "156.1*cot(35) - 48.15/0.4815 = 222.93 - 100 = 122.9",
    ),
    W("cutoff.PAST_INWARD", {"x_t": 1900, "x_e": 1200}, "1900 - 1200 = 700.0"),
    W("cutoff.PAST_OUTWARD", {"x_t": 1100, "x_e": 1800}, "1800 - 1100 = 700.0"),
    W("cutoff.CONTINUING_INWARD", {"x_t": 1900, "x_co": 150}, "1900 - 150 = 1750.0"),
    W("cutoff.PAST_SUPPORT", {"x_t": 1100, "x_e": 500}, "500 + 1100 = 1600.0"),
    W("cutoff.CONTINUING_PAST_SUPPORT", {"x_t": 1100, "x_co": 1550}, "1550 + 1100 = 2650.0"),
    W("cutoff.CONTINUING_OUTWARD", {"x_t": 1100, "x_co": 2500}, "2500 - 1100 = 1400.0"),
    # 150 mm past a face that lies 200 mm from the axis
    W("cutoff.IN_SUPPORT", {"b_sp": 400, "x_e": 50}, "400/2 - 50 = 150.0"),
    W("cutoff.PAST_CENTRE", {"b_sp": 400, "c_end": 50}, "400/2 - 50 = 150.0", CHECK_12 + "c"),
    W("cutoff.CONTINUING", {"l_d": 767, "d": 535, "d_b": 25.2}, "767 + 535 = 1302"),
    W("cutoff.PAST_FACE", {"x_e": 2000, "b_sp": 400}, "2000 - 400/2 = 1800.0"),
    W("cutoff.PAST_INFLECTION", {"l_ext": 700, "d": 535, "d_b": 25.2}, "min(700, 535) = 535"),
    W("cutoff.PAST_INFLECTION", {"l_ext": 400, "d": 535, "d_b": 25.2}, "min(400, 535) = 400"),
    W(
        "cutoff.LIMIT",
        {"M_r": 172.8, "V_f": 260, "l_a": 150},
        "172.8e6/260e3 + 150 = 664.615 + 150 = 815",
        CHECK_12 + "c",
    ),
    W(
        "cutoff.LIMIT_CONFINED",
        {"M_r": 172.8, "V_f": 260, "l_a": 150},
        "1.3*664.615 + 150 = 1014",
        CHECK_12 + "c",
    ),
    W(
        "cutoff.LENGTH_PAST_INFLECTION",
        {"d": 535, "d_b": 25.2, "l_n": 9.6},
        "max(535, 302.4, 9600/16) = 600",
    ),
)
WORKED_ANCHORAGE = (*DEVELOPMENT, *HOOKS, *LAPS, *CUTOFF)
