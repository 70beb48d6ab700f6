"""Worked numbers of the catalogue, part 4: combinations, live load, analysis, deflections."""

from __future__ import annotations

from .worked import CHECK_2, Worked

W = Worked
CHECK_3 = "hand calculation, independent check no. 3"
CHECK_11 = "hand calculation, independent check no. 11"
CHECK_15 = "hand calculation, independent check no. 15"
DLS = {"w_D": 12.4, "w_L": 9, "w_S": 6.5}
DL, DS = {"w_D": 12.4, "w_L": 9}, {"w_D": 12.4, "w_S": 6.5}
LOADS = (
    W("combinations.CASE_2_SNOW", DLS, "1.25*12.4 + 1.5*9 + 1.0*6.5 = 35.50", CHECK_2),
    W("combinations.CASE_2_COUNTERACTING", DL, "0.9*12.4 + 1.5*9 = 11.16 + 13.5 = 24.66"),
    W("combinations.CASE_3", DS, "1.25*12.4 + 1.5*6.5 = 15.5 + 9.75 = 25.25"),
    W("combinations.CASE_3_LIVE", DLS, "1.25*12.4 + 1.5*6.5 + 1.0*9 = 34.25", CHECK_2),
    # storage: the companion factor is 1.0 + 0.5
    W("combinations.CASE_3_STORAGE", DLS, "15.5 + 9.75 + (1.0 + 0.5)*9 = 38.75"),
    W("combinations.SERVICE_1", DL, "12.4 + 9 = 21.4"),
    W("combinations.SERVICE_1_SNOW", DLS, "12.4 + 9 + 0.35*6.5 = 23.675", CHECK_2 + ": 23.68"),
    W("combinations.SERVICE_3", DS, "12.4 + 6.5 = 18.9"),
    W("combinations.SERVICE_3_LIVE", DLS, "12.4 + 6.5 + 0.35*9 = 22.05", CHECK_2),
    W("combinations.SERVICE_3_STORAGE", DLS, "12.4 + 6.5 + 0.5*9 = 23.4"),
    W("combinations.SUSTAINED_LIVE", {"r_Ls": 0.2, "w_L": 9}, "0.2*9 = 1.8"),
    W("combinations.TRANSIENT_LIVE", {"w_L": 9, "w_Ls": 1.8}, "9 - 1.8 = 7.2"),
    W("combinations.SUSTAINED", {"w_D": 12.4, "w_Ls": 1.8}, "12.4 + 1.8 = 14.2"),
    W("reduction.TRIBUTARY_AREA", {"l": 9, "b_tr": 6}, "9*6 = 54", CHECK_3),
    W(
        "reduction.FACTOR_OTHER",
        {"A_0": 9.8, "A_L": 54},
        "0.3 + sqrt(9.8/54) = 0.3 + 0.42601 = 0.726",
        CHECK_3,
    ),
    W(
        "reduction.FACTOR_HEAVY",
        {"A_0": 20, "A_L": 120},
        "0.5 + sqrt(20/120) = 0.5 + 0.408248 = 0.908",
        CHECK_3,
    ),
    W("reduction.LIVE_REDUCED", {"r_L": 0.726, "q_L": 2.4, "b_tr": 6}, "0.726*2.4*6 = 10.4544"),
)
COEFFICIENTS = "hand calculation with the coefficient of case K12 (textbook table, text opened)"
ANALYSIS = (
    W(
        "analysis.LARGEST_CHANGE",
        {"c": 126.26, "d": 535},
        "30 - 50*126.26/535 = 30 - 50*0.236 = 18.2",
        CHECK_15,
    ),
    W("analysis.LARGEST_CHANGE", {"c": 50, "d": 500}, "min(30 - 5, 20) = 20.0"),
    W("analysis.LARGEST_CHANGE", {"c": 350, "d": 500}, "max(30 - 35, 0) = 0.0"),
    W("analysis.CLEAR_SPAN", {"l": 7.6, "b_sl": 400, "b_sr": 450}, "7.6 - (0.4 + 0.45)/2 = 7.175"),
    W("analysis.CLEAR_FROM_LEFT", {"l": 2.1, "b_sl": 400}, "2.1 - 0.4/2 = 1.9"),
    W("analysis.CLEAR_FROM_RIGHT", {"l": 2.1, "b_sr": 450}, "2.1 - 0.45/2 = 1.875"),
    W("analysis.TO_FACE", {"b_sn": 450}, "0.45/2 = 0.225"),
    W("analysis.FROM_FACE", {"b_sn": 450, "d_v": 505.8}, "0.45/2 + 0.5058 = 0.7308"),
    W("analysis.REDISTRIBUTED", {"M_fe": 240, "p_rd": 15}, "240*(1 - 0.15) = 204"),
    W("analysis.MEAN_SPAN", {"l_n1": 7.2, "l_n2": 6.4}, "(7.2 + 6.4)/2 = 6.8"),
    W(
        "analysis.POSITIVE",
        {"w_f": 40, "l_n": 7, "k_M": 14},
        "40*7**2/14 = 1960/14 = 140",
        COEFFICIENTS,
    ),
    W(
        "analysis.NEGATIVE",
        {"w_f": 40, "l_na": 6.8, "k_M": 10},
        "40*6.8**2/10 = 184.96",
        COEFFICIENTS,
    ),
    W(
        "analysis.SHEAR",
        {"k_V": 1.15, "w_f": 40, "l_n": 7},
        "1.15*40*7/2 = 161",
        COEFFICIENTS,
    ),
)
# Check no. 11: n = 200000/26622 = 7.51258, n A_s = 15025.2, B = 350/15025.2 = 0.0232942;
# kd = (sqrt(2 x 535 B + 1) - 1)/B = (sqrt(25.9248) - 1)/B = 4.0916/B = 175.65
N = {"n_E": 7.51258, "A_s": 2000, "d": 535}
# T: b 900, b_w 300, h_f 100, d 600, A_s 7000, n 8: n A_s = 56000; first moments about the axis:
# 600*100*(x - 50) + 150 x^2 = 56000*(600 - x): 150 x^2 + 116000 x - 36 600 000 = 0, x 240.64
TEE: dict[str, float] = {"b": 900, "b_w": 300, "h_f": 100, "n_E": 8, "A_s": 7000, "d": 600}
STAGE = {"delta_DL": 14.0, "delta_sus": 8.0}
DEFLECTION = (
    W("deflection.STEEL_MODIFIER", {"f_y": 500}, "0.4 + 500/670 = 1.14627"),
    W("deflection.STEEL_MODIFIER", {"f_y": 400}, "max(0.4 + 0.597, 1) = 1.000"),
    W("deflection.DENSITY_MODIFIER", {"gamma_c": 1850}, "1.65 - 0.0003*1850 = 1.095"),
    W("deflection.DENSITY_MODIFIER", {"gamma_c": 2350}, "max(1.65 - 0.705, 1) = 1.000"),
    W("deflection.LEAST_DEPTH", {"l_n": 7.2, "k_h": 16}, "7200/16 = 450"),
    W(
        "deflection.LEAST_DEPTH_MODIFIED",
        {"l_n": 7.2, "k_h": 16, "k_fy": 1.1463, "k_gc": 1.095},
        "7200/16*1.1463*1.095 = 450*1.255199 = 564.8",
    ),
    W("deflection.F_R_DEFLECTION", {"f_r": 3.550}, "0.5*3.550 = 1.775", CHECK_11),
    W(
        "deflection.CRACKING_BOTTOM",
        {"f_rd": 1.774824, "I_g": 6.3e9, "y_b": 300},
        "0.3*sqrt(35)*6.3e9/300/1e6 = 1.774824*21 = 37.27",
        CHECK_11,
    ),
    W(
        "deflection.CRACKING_TOP",
        {"f_rd": 1.774824, "I_g": 6.3e9, "y_t": 300},
        "1.774824*6300/300 = 37.27",
        CHECK_11,
    ),
    W("deflection.MODULAR_RATIO", {"E_s": 200000, "E_c": 26622}, "200000/26622 = 7.5126"),
    W(
        "deflection.AXIS",
        {**N, "b": 350},
        "(sqrt(2*535*350/15025.16 + 1) - 1)*15025.16/350 = 4.091640*42.929 = 175.65",
        CHECK_11,
    ),
    # n A_s = 15000, (n - 1)A'_s = 3900: 175 x^2 + 18900 x - 15000*535 - 3900*60 = 0
    W(
        "deflection.AXIS_COMPRESSION_BARS",
        {"n_E": 7.5, "A_s": 2000, "A_sp": 600, "b": 350, "d": 535, "d_p": 60},
        "(sqrt(18900**2 + 2*350*(15000*535 + 3900*60)) - 18900)/350"
        " = (sqrt(6138510000) - 18900)/350 = 169.85",
    ),
    W(
        "deflection.AXIS_IN_WEB",
        TEE,
        "(sqrt(116000**2 + 4*150*36600000) - 116000)/300 = (sqrt(35416000000) - 116000)/300"
        " = 240.64",
    ),
    W(
        "deflection.CRACKED",
        {**N, "b": 350, "kd": 175.652},
        "350*175.652**3/3 + 15025.16*(535 - 175.652)**2 = 632.28e6 + 1940.21e6 = 2572e6",
        CHECK_11,
    ),
    W(
        "deflection.CRACKED_COMPRESSION_BARS",
        {"n_E": 7.5, "A_s": 2000, "A_sp": 600, "b": 350, "d": 535, "d_p": 60, "kd": 169.85},
        "350*169.85**3/3 + 15000*365.15**2 + 3900*109.85**2 = 571.67e6 + 2000.02e6 + 47.06e6"
        " = 2619e6",
    ),
    W(
        "deflection.CRACKED_TEE",
        {**TEE, "kd_w": 240.64},
        "600*100**3/12 + 60000*190.64**2 + 300*240.64**3/3 + 56000*359.36**2"
        " = 50e6 + 2180.617e6 + 1393.489e6 + 7231.818e6 = 10856e6",
    ),
    W("deflection.MOMENT_SIMPLE", {"w_s": 20, "l": 7}, "20*49/8 = 122.5", CHECK_11 + "b"),
    W(
        "deflection.EFFECTIVE",
        {"I_cr": 2572.5e6, "I_g": 6.3e9, "M_crd": 37.27, "M_a": 150},
        "2572.5e6 + 3727.5e6*(37.27/150)**3 = 2572.5e6 + 57.18e6 = 2630e6",
        CHECK_11,
    ),
    W(
        "deflection.EFFECTIVE",
        {"I_cr": 2572.5e6, "I_g": 6.3e9, "M_crd": 37.27, "M_a": 122.5},
        "2572.5e6 + 3727.5e6*0.304245**3 = 2572.5e6 + 104.98e6 = 2677e6",
        CHECK_11 + "b",
    ),
    # not cracked: the gross section counts
    W(
        "deflection.EFFECTIVE",
        {"I_cr": 2572.5e6, "I_g": 6.3e9, "M_crd": 37.27, "M_a": 30},
        "6.3e9 = 6300e6",
    ),
    W(
        "deflection.EFFECTIVE_TOP",
        {"I_cr": 2572.5e6, "I_g": 6.3e9, "M_crdn": 37.27, "M_a": 150},
        "2572.5e6 + 57.18e6 = 2630e6",
        CHECK_11,
    ),
    W(
        "deflection.BOTH_ENDS",
        {"I_em": 2629.7e6, "I_e1": 2000e6, "I_e2": 2400e6},
        "0.7*2629.7e6 + 0.15*4400e6 = 1840.79e6 + 660e6 = 2501e6",
        CHECK_11,
    ),
    W(
        "deflection.ONE_END",
        {"I_em": 2629.7e6, "I_ec": 2000e6},
        "0.85*2629.7e6 + 0.15*2000e6 = 2235.245e6 + 300e6 = 2535e6",
        CHECK_11,
    ),
    W(
        "deflection.COMPRESSION_RATIO",
        {"A_sp": 600, "b": 350, "d": 535},
        "600/(350*535) = 0.0032043",
        CHECK_11 + "b",
    ),
    W(
        "deflection.LONG_TERM",
        {"S_t": 2, "rho_p": 0.0032043},
        "1 + 2/(1 + 50*0.0032043) = 1 + 2/1.160215 = 2.724",
        CHECK_11 + "b",
    ),
    W("deflection.LONG_TERM_ATTACHED", {"S_t": 1, "rho_p": 0.0032043}, "1 + 1/1.160215 = 1.8619"),
    W(
        "deflection.SIMPLE_SPAN",
        {"w_s": 20, "l": 7, "E_c": 26622, "I_e": 2677e6},
        "5*20*7000**4/(384*26622*2677e6) = 2.401e17/2.736660e16 = 8.77",
        CHECK_11 + "b",
    ),
    W(
        "deflection.CANTILEVER",
        {"w_s": 20, "l": 2, "E_c": 25000, "I_e": 1e9},
        "20*2000**4/(8*25000*1e9) = 3.2e14/2e14 = 1.6",
    ),
    # fixed ends, w 20, l 6: w l^2/24 = 30 and w l^2/12 = 60 kN.m give w l^4/(384 E I)
    W(
        "deflection.CONTINUOUS_SPAN",
        {"l": 6, "E_c": 25000, "I_ea": 1e9, "M_m": 30, "M_h1": 60, "M_h2": 60},
        "5*6000**2/(48*25000*1e9)*18e6 = 20*6000**4/(384*25000*1e9) = 2.7",
    ),
    W("deflection.LIVE", {"delta_DL": 14, "delta_D": 6.5}, "14 - 6.5 = 7.5"),
    W("deflection.REST_OF_LIVE", STAGE, "14 - 8 = 6"),
    W(
        "deflection.TOTAL",
        {"zeta_s": 2.724, "delta_sus": 8, "delta_Lr": 6},
        "2.724*8 + 6 = 27.792",
    ),
    W(
        "deflection.AFTER_ATTACHMENT",
        {"zeta_s": 2.724, "zeta_sa": 1.862, "delta_sus": 8, "delta_Lr": 6},
        "(2.724 - 1.862)*8 + 6 = 12.896",
    ),
    W("deflection.LARGEST", {"l_n": 7.2, "k_D": 480}, "7200/480 = 15"),
)
# Stages. Point loads: 40 kN at 2 m on 8 m: simple span, P a (3 l^2 - 4 a^2)/48
# = 40*2*(192 - 16)/48 = 293.333; 5 l^2/48 (P a/2 + M_P) = 6.66667*(40 + 4) = 293.333
STAGES = (
    W("deflection_stages.LARGEST_SO_FAR", {"M_s": 80, "M_ae": 95}, "max(80, 95) = 95.0"),
    W(
        "deflection_stages.CRACKING_WEB",
        {"f_rd": 1.774824, "b_w": 350, "h": 600},
        "1.774824*350*600**2/6/1e6 = 37.27",
        CHECK_11,
    ),
    W("deflection_stages.GROSS", {"I_g": 6.3e9}, "6.3e9 = 6300e6"),
    # check no. 11b from the moment: 122.5 kN.m
    W(
        "deflection_stages.SIMPLE_SPAN",
        {"l": 7, "E_c": 26622, "I_e": 2677e6, "M_m": 122.5},
        "5*7000**2/(48*26622*2677e6)*122.5e6 = 8.77",
        CHECK_11 + "b",
    ),
    # propped cantilever, w 16, l 6: M at midspan w l^2/16 = 36, at the root w l^2/8 = 72;
    # w l^4/(192 E I) = 16*1296e12/(192*25000*1e9) = 4.32
    W(
        "deflection_stages.ONE_END_SPAN",
        {"l": 6, "E_c": 25000, "I_ea": 1e9, "M_m": 36, "M_h": 72},
        "5*6000**2/(48*25000*1e9)*28.8e6 = 16*6000**4/(192*25000*1e9) = 4.32",
    ),
    # w 20, l 2: M = 40; w l^4/(8 E I) = 1.6
    W(
        "deflection_stages.CANTILEVER_BENDING",
        {"M_h": 40, "l": 2, "E_c": 25000, "I_e": 1e9},
        "40e6*2000**2/(4*25000*1e9) = 20*2000**4/(8*25000*1e9) = 1.6",
    ),
    # 100 at the root, 0 at the far end, 30 at midspan: uniform load with w l^2/8 = 80;
    # M l/(3 E I) - w l^3/(24 E I) = (100*6/3 - 80*6/3)/(E I) = 40/(E I), in kN and m
    W(
        "deflection_stages.ROOT_ROTATION",
        {"l_bk": 6, "M_hb": 100, "M_mb": 30, "E_c": 25000, "I_bk": 1e9},
        "6000*40e6/(6*25000*1e9) = (100e6*6000/3 - 80e6*6000/3)/(25000*1e9) = 0.0016",
    ),
    W(
        "deflection_stages.TIP",
        {"delta_b": 1.6, "theta_r": 0.0032, "l": 2},
        "1.6 + 0.0032*2000 = 8.0",
    ),
    W("deflection_stages.TIP_FIXED", {"delta_b": 1.6}, "1.6 = 1.6"),
    W("deflection_stages.FROM_NEARER", {"x_P": 6, "l": 8}, "min(6, 8 - 6) = 2.0"),
    W("deflection_stages.FROM_RIGHT", {"x_P": 0.5, "l": 2}, "2 - 0.5 = 1.5"),
    W(
        "deflection_stages.POINT_LOAD",
        {"P_s": 40, "a_s": 2, "l": 8},
        "0.1*40*2*(1 - 8*4/64) = 293.3333333/6.6666667 - 40 = 4.0",
    ),
    # at the tip: P l^3/3 = l^2/4 (P l + M_P), M_P = P l/3
    W(
        "deflection_stages.POINT_LOAD_CANTILEVER",
        {"P_s": 15, "a_s": 2, "l": 2},
        "15*2*(2 - 2/3 - 1) = 15*2/3 = 10.0",
    ),
    # 40 kN 6 m from the far end of 8 m, 2 m from the root: P b (l^2 - b^2)/(6 l)
    # = 40*6*28/48 = 140 = 8/3*(40 + M_P)
    W(
        "deflection_stages.POINT_LOAD_BEHIND",
        {"P_s": 40, "b_s": 6, "l_bk": 8, "a_s": 2},
        "0.5*40*(6*(1 - 36/64) - 2) = 140*3/8 - 40 = 12.5",
    ),
    W("deflection_stages.WITH_LOCAL_LOADS", {"M_s": 140, "M_P": 4}, "140 + 4 = 144"),
    W("deflection_stages.HALF_OF_PARTIAL", {"w_p": 10, "x_1": 1, "x_2": 3}, "10*2/2 = 10.0"),
    W("deflection_stages.FIRST_POINT", {"x_1": 1, "x_2": 3}, "2 - 2/sqrt(12) = 1.42265"),
    W("deflection_stages.SECOND_POINT", {"x_1": 1, "x_2": 3}, "2 + 2/sqrt(12) = 2.57735"),
    W("deflection_stages.MIDDLE", {"l": 7.6}, "7.6/2 = 3.8"),
    W("deflection_stages.LONG_TERM_PLAIN", {"S_t": 2}, "1 + 2 = 3.0"),
    W("deflection_stages.LONG_TERM_ATTACHED_PLAIN", {"S_ta": 1}, "1 + 1 = 2.0"),
    W("deflection_stages.HOGGING_SIZE", {"M_s": 80}, "max(80, 0 - 80) = 80.0"),
    W("deflection_stages.RISE", {"delta_D": 2, "delta_R": 0.5}, "2 - 0.5 = 1.5"),
    # the smaller of both lasting deflections creeps: 1.0*2; the signs turned, as the walk asks
    W(
        "deflection_stages.RISE_ATTACHED",
        {"delta_D": 2, "delta_R": 1, "zeta_sa": 3, "zeta_s": 2, "delta_sus": 3},
        "2 - 1 + max((3 - 2)*min(2, 3), 0) = 3.0",
    ),
    W("deflection_stages.CAMBER", {"zeta_s": 2.724, "delta_sus": 8}, "2.724*8 = 21.79"),
)
WORKED_SERVICE = (*LOADS, *ANALYSIS, *DEFLECTION, *STAGES)
