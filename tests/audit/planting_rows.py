"""Slips as a junior makes them: which line, what was worked instead, what a checker would name.

Each row stands for itself: the formula of a line as printed, and the formula that was worked in its
place, written out. Nothing here knows how slips are searched for.
"""

from __future__ import annotations

from typing import NamedTuple

LEFT_OUT = "factor left out"
TWICE = "factor twice"
SYMBOL = "one symbol for another"
DIAMETER = "diameter for radius"
COUNT = "bar count changed, area not"
LEG = "one leg for all"
A_T = "A_t for A_v"
ROOT = "root or square forgotten"
SIGN = "sign"
UNIT = "unit"
DEGREES = "degrees for radians"
SERVICE = "service for factored"
TRIBUTARY = "half or full width"
CLEAR = "clear for centre span"
SIMPLE = "wl2/8 on a continuous span"
FACE = "centreline for face"
SIDE = "left for right support"
ZONE = "neighbouring zone's value"
BAR_ROW = "neighbouring row of a table"
EDITION = "another edition's constant"
STANDARD = "another standard's constant"
DIGIT = "digits of the result"
DIGIT_IN = "digits of an argument"
UNIT_WRITTEN = "unit of the written value only"
DIGIT_WRITTEN = "digits of the written value only"
KINDS = (
    LEFT_OUT, TWICE, SYMBOL, DIAMETER, COUNT, LEG, A_T, ROOT, SIGN, UNIT, DEGREES, SERVICE,
    TRIBUTARY, CLEAR, SIMPLE, FACE, SIDE, ZONE, BAR_ROW, EDITION, STANDARD, DIGIT, DIGIT_IN,
    UNIT_WRITTEN, DIGIT_WRITTEN,
)  # fmt: skip

WORDS = {
    LEFT_OUT: "left out|missing|omitted|forgotten|without",
    TWICE: "twice|doubled|two times|squared",
    SYMBOL: "in place of|instead of|for",
    DIAMETER: "diameter|radius",
    COUNT: "count|number|bars",
    LEG: "leg",
    A_T: "in place of|instead of|for|leg",
    ROOT: "root|square|power",
    SIGN: "sign|added|subtracted|plus|minus|taken off",
    UNIT: "unit|kN|mm|10\\^|1000|thousand",
    DEGREES: "degree|radian",
    SERVICE: "service|factored|load factor|specified",
    TRIBUTARY: "width|spacing",
    CLEAR: "clear|in place of|instead of|for",
    SIMPLE: "simple|l\\*\\*2/8|l²/8|l2/8|wl",
    FACE: "cent(?:re|er)|face",
    SIDE: "left|right|other|swapped|exchanged",
    ZONE: "zone|neighbour|other|next|place|span|section|row",
    BAR_ROW: "row|neighbour|next|table|bar|15M|20M|25M|30M|35M",
    EDITION: "edition|standard|constant|A23",
    STANDARD: "standard|ACI|constant|edition",
    DIGIT: "digit|transposed|mistyped|typed",
    DIGIT_IN: "digit|transposed|mistyped|typed",
    UNIT_WRITTEN: "unit|kN|mm|10\\^|1000|thousand",
    DIGIT_WRITTEN: "digit|transposed|mistyped|typed",
}
"""By kind the words of which one at least must stand in the sentence or in its kind."""


class Row(NamedTuple):
    """A slip on one formula: ``right`` was to be worked, ``wrong`` was.

    ``says`` holds what a sentence that tells it must name, as alternatives: each a list of names
    joined by ``&``; an alternative that begins with ``~`` needs none of the kind's own words.
    """

    kind: str
    right: str
    wrong: str
    says: tuple[str, ...]


M_R = "phi_s*A_s*f_y*(d - a/2)"
A = "phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b)"
A_SR = "alpha_1*phi_c*f_c*b*a_r/(phi_s*f_y)"
V_C = "phi_c*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v"
V_S = "phi_s*A_v*f_y*d_v*cot(theta)/s"
V_RMAX = "0.25*phi_c*f_c*b_w*d_v"
F_LT = "M_f/d_v + (V_f - 0.5*min(V_s, V_f))*cot(theta)"
L_D0 = "0.45*min(k_1*k_2, 1.7)*k_3*k_4*f_y/min(sqrt(f_c), 8)*d_b"
A_SMIN = "0.2*sqrt(f_c)*b_t*h/f_y"
A_VMIN = "0.06*sqrt(f_c)*b_w*s/f_y"
D = "h - c_c - d_bs - d_b/2"
D_C = "c_c + d_bs + d_b/2"
KD = "n_E*A_s/b*(sqrt(1 + 2*b*d/(n_E*A_s)) - 1)"
I_CR = "b*kd**3/3 + n_E*A_s*(d - kd)**2"
EPS_X = "(max(M_f, V_f*d_v)/d_v + V_f)/(2*E_s*A_s)"
M_SAG = "V_sn*x_f - w_f*x_f**2/2"
M_SPAN = "M_sn + V_sn*x_f - w_f*x_f**2/2"
M_HOG = "-(M_sn + V_sn*x_f - w_f*x_f**2/2)"
M_SIMPLE = "w_f*l**2/8"
M_END = "w_f*l**2/24"
M_M1, M_M2 = "w_s*l**2/8 - (M_h1)/2", "w_s*l**2/8 - (M_h2)/2"
M_M12 = "w_s*l**2/8 - (M_h1 + M_h2)/2"
V_SN1, V_SN2 = "w_f*l/2 - M_sn/l", "w_f*l/2 + M_sf/l"
V_SN12 = "w_f*l/2 + (M_sf - M_sn)/l"
DELTA_1 = "5*l**2/(48*E_c*I_ea)*(M_m - 0.1*M_h)"
DELTA_0 = "5*l**2/(48*E_c*I_e)*M_m"
DELTA_T = "zeta_s*delta_sus + delta_Lr"
A_E = "2*d_s*b_w/n_z"
I_E = "min(I_cr + (I_g - I_cr)*(M_crd/M_a)**3, I_g)"
S_C = "(b_w - 2*(c_c + d_bs + max(r_s, d_b/2)))/(n_b - 1) - d_b"
M_RF = "alpha_1*phi_c*f_c*b*h_f*(d - h_f/2)"
HALF = ("2", "0.5", "half")

ROWS = (
    Row(LEFT_OUT, M_R, "A_s*f_y*(d - a/2)", ("phi_s",)),
    Row(LEFT_OUT, M_R, "phi_s*A_s*f_y*(d - a)", (*HALF, "~a")),
    Row(LEFT_OUT, A, "phi_s*A_s*f_y/(phi_c*f_c*b)", ("alpha_1",)),
    Row(LEFT_OUT, A, "phi_s*A_s*f_y/(alpha_1*f_c*b)", ("phi_c",)),
    Row(LEFT_OUT, A, "A_s*f_y/(alpha_1*phi_c*f_c*b)", ("phi_s",)),
    Row(LEFT_OUT, A_SR, "alpha_1*phi_c*f_c*b*a_r/f_y", ("phi_s",)),
    Row(LEFT_OUT, A_SR, "phi_c*f_c*b*a_r/(phi_s*f_y)", ("alpha_1",)),
    Row(LEFT_OUT, V_C, "lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v", ("phi_c",)),
    Row(LEFT_OUT, V_C, "phi_c*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v", ("lambda_",)),
    Row(LEFT_OUT, V_S, "A_v*f_y*d_v*cot(theta)/s", ("phi_s",)),
    Row(LEFT_OUT, V_RMAX, "0.25*f_c*b_w*d_v", ("phi_c",)),
    Row(LEFT_OUT, "0.6*lambda_*sqrt(f_c)", "0.6*sqrt(f_c)", ("lambda_",)),
    Row(LEFT_OUT, L_D0, "0.45*min(k_1*k_2, 1.7)*k_3*f_y/min(sqrt(f_c), 8)*d_b", ("k_4",)),
    Row(LEFT_OUT, L_D0, "0.45*min(k_1*k_2, 1.7)*k_4*f_y/min(sqrt(f_c), 8)*d_b", ("k_3",)),
    Row(LEFT_OUT, L_D0, "0.45*k_3*k_4*f_y/min(sqrt(f_c), 8)*d_b", ("k_1", "k_2")),
    Row(LEFT_OUT, F_LT, "M_f/d_v + (V_f - min(V_s, V_f))*cot(theta)", (*HALF,)),
    Row(LEFT_OUT, DELTA_T, "delta_sus + delta_Lr", ("zeta_s",)),
    Row(LEFT_OUT, A_E, "d_s*b_w/n_z", HALF),
    Row(LEFT_OUT, A_E, "2*d_s*b_w", ("n_z",)),
    Row(LEFT_OUT, M_RF, "phi_c*f_c*b*h_f*(d - h_f/2)", ("alpha_1",)),
    Row(LEFT_OUT, "gamma_w*b_w*(h - h_f)", "gamma_w*b_w*h", ("h_f",)),
    Row(TWICE, M_R, "phi_s*phi_s*A_s*f_y*(d - a/2)", ("phi_s",)),
    Row(TWICE, A, "phi_s*A_s*f_y/(alpha_1*alpha_1*phi_c*f_c*b)", ("alpha_1",)),
    Row(TWICE, A, "phi_s*A_s*f_y/(alpha_1*phi_c*phi_c*f_c*b)", ("phi_c",)),
    Row(TWICE, A_SR, "alpha_1*phi_c*f_c*b*a_r/(phi_s*phi_s*f_y)", ("phi_s",)),
    Row(TWICE, V_C, "phi_c*phi_c*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v", ("phi_c",)),
    Row(TWICE, V_S, "phi_s*phi_s*A_v*f_y*d_v*cot(theta)/s", ("phi_s",)),
    Row(TWICE, V_RMAX, "0.25*phi_c*phi_c*f_c*b_w*d_v", ("phi_c",)),
    Row(TWICE, "0.5*f_r", "0.5*0.5*f_r", HALF),
    Row(TWICE, A_E, "2*2*d_s*b_w/n_z", HALF),
    Row(SYMBOL, M_R, "phi_s*A_s*f_y*(h - a/2)", ("h & d",)),
    Row(SYMBOL, A, "phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b_w)", ("b_w & b", "b_w & b_f")),
    Row(SYMBOL, A, "phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b_f)", ("b_f & b", "b_f & b_w")),
    Row(SYMBOL, A_SR, "alpha_1*phi_c*f_c*b_w*a_r/(phi_s*f_y)", ("b_w & b", "b_w & b_f")),
    Row(SYMBOL, V_C, "phi_c*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*d", ("d & d_v",)),
    Row(SYMBOL, V_C, "phi_c*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*h", ("h & d_v",)),
    Row(SYMBOL, V_C, "phi_c*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_f*d_v", ("b_f & b_w",)),
    Row(SYMBOL, V_S, "phi_s*A_v*f_y*d*cot(theta)/s", ("d & d_v",)),
    Row(SYMBOL, V_RMAX, "0.25*phi_c*f_c*b_w*d", ("d & d_v",)),
    Row(SYMBOL, "max(0.9*d, 0.72*h)", "max(0.9*h, 0.72*h)", ("h & d",)),
    Row(SYMBOL, "f_r*I_g/y_b", "f_r*I_g/y_t", ("y_t & y_b",)),
    Row(SYMBOL, A_SMIN, "0.2*sqrt(f_c)*b_w*h/f_y", ("b_w & b_t",)),
    Row(SYMBOL, A_SMIN, "0.2*sqrt(f_c)*b_t*d/f_y", ("d & h",)),
    Row(SYMBOL, KD, "n_E*A_s/b*(sqrt(1 + 2*b*h/(n_E*A_s)) - 1)", ("h & d",)),
    Row(SYMBOL, I_CR, "b_w*kd**3/3 + n_E*A_s*(d - kd)**2", ("b_w & b", "b_w & b_f")),
    Row(SYMBOL, EPS_X, "(max(M_f, V_f*d_v)/d_v + V_f)/(2*E_s*A_sp)", ("A_sp & A_s",)),
    Row(SYMBOL, D, "h - c_c - d_b - d_b/2", ("d_b & d_bs",)),
    Row(SYMBOL, I_E, "min(I_cr + (I_g - I_cr)*(M_cr/M_a)**3, I_g)", ("M_cr & M_crd",)),
    Row(DIAMETER, D, "h - c_c - d_bs - d_b", ("d_b", "~left out & 2", "~left out & 0.5")),
    Row(DIAMETER, D, "h - c_c - d_bs/2 - d_b/2", ("d_bs", "stirrup")),
    Row(DIAMETER, D_C, "c_c + d_bs + d_b", ("d_b", "~left out & 2", "~left out & 0.5")),
    Row(LEG, "n_v*A_t", "n_v*A_t/2", ("~leg", "~n_v", "~A_t")),
    Row(LEG, "n_v*A_bs", "A_bs", ("~leg", "~n_v", "~A_bs")),
    Row(LEG, V_S, "phi_s*(A_v/2)*f_y*d_v*cot(theta)/s", ("~leg", "~A_t & A_v")),
    Row(A_T, V_S, "phi_s*A_t*f_y*d_v*cot(theta)/s", ("A_t & A_v", "~leg")),
    Row(A_T, "A_v*f_y/(0.06*sqrt(f_c)*b_w)", "A_t*f_y/(0.06*sqrt(f_c)*b_w)", ("A_t & A_v", "~leg")),
    Row(A_T, "n_h*A_v", "n_h*A_t", ("A_t & A_v", "~leg")),
    Row(ROOT, "0.6*lambda_*sqrt(f_c)", "0.6*lambda_*f_c", ("root", "f_c")),
    Row(ROOT, A_SMIN, "0.2*f_c*b_t*h/f_y", ("root", "f_c")),
    Row(ROOT, A_VMIN, "0.06*f_c*b_w*s/f_y", ("root", "f_c")),
    Row(ROOT, L_D0, "0.45*min(k_1*k_2, 1.7)*k_3*k_4*f_y/min(f_c, 8)*d_b", ("root", "f_c")),
    Row(ROOT, V_C, "phi_c*lambda_*beta*min(1.0*f_c, 8)*b_w*d_v", ("root", "f_c")),
    # In kN and m, as a load and a span are written: w_f*l/8 of kN/m and m, read as kN.m.
    Row(ROOT, M_SIMPLE, "1000*w_f*l/8", ("square", "l", "power")),
    Row(ROOT, M_END, "1000*w_f*l/24", ("square", "l", "power")),
    Row(ROOT, M_SAG, "V_sn*x_f - 1000*w_f*x_f/2", ("square", "x_f", "power")),
    Row(ROOT, M_HOG, "-(M_sn + V_sn*x_f - 1000*w_f*x_f/2)", ("square", "x_f", "power")),
    Row(ROOT, M_M1, "1000*w_s*l/8 - (M_h1)/2", ("square", "l", "power")),
    Row(ROOT, "f_rd*b_w*h**2/6", "f_rd*b_w*h/6", ("square", "h", "power")),
    Row(ROOT, I_CR, "b*kd**3/3 + n_E*A_s*(d - kd)", ("square", "d - kd", "power")),
    Row(SIGN, M_R, "phi_s*A_s*f_y*(d + a/2)", ("~sign", "a")),
    Row(SIGN, D, "h - c_c - d_bs + d_b/2", ("~sign", "d_b")),
    Row(SIGN, "V_sn - w_f*x_f", "V_sn + w_f*x_f", ("~sign", "x_f")),
    Row(SIGN, M_SAG, "V_sn*x_f + w_f*x_f**2/2", ("~sign", "x_f")),
    Row(SIGN, M_HOG, "-(M_sn + V_sn*x_f + w_f*x_f**2/2)", ("~sign", "x_f")),
    Row(SIGN, M_HOG, "-(-M_sn + V_sn*x_f - w_f*x_f**2/2)", ("~sign", "M_sn")),
    Row(SIGN, M_M1, "w_s*l**2/8 + (M_h1)/2", ("~sign", "M_h1")),
    Row(SIGN, V_SN1, "w_f*l/2 + M_sn/l", ("~sign", "M_sn")),
    Row(SIGN, V_SN2, "w_f*l/2 - M_sf/l", ("~sign", "M_sf")),
    Row(SIGN, "h - y_b", "h + y_b", ("~sign", "y_b")),
    Row(SIGN, "l - (b_sl + b_sr)/2", "l + (b_sl + b_sr)/2", ("~sign", "b_sl")),
    Row(SIGN, "delta_DL - delta_D", "delta_DL + delta_D", ("~sign", "delta_D")),
    Row(UNIT, EPS_X, "(max(M_f/1000, V_f*d_v)/d_v + V_f)/(2*E_s*A_s)", ("M_f",)),
    Row(UNIT, EPS_X, "(max(M_f, V_f*d_v)/d_v + V_f/1000)/(2*E_s*A_s)", ("V_f",)),
    Row(UNIT, F_LT, "M_f/d_v/1000 + (V_f - 0.5*min(V_s, V_f))*cot(theta)", ("M_f",)),
    Row(SERVICE, "1.25*w_D + 1.5*w_L", "w_D + w_L", ("~service", "~factor", "~1.25")),
    Row(TRIBUTARY, "gamma_w*h_f*b_tr", "gamma_w*h_f*b_tr/2", ("~b_tr", "~tributary", "~half")),
    Row(TRIBUTARY, "q_SD*b_tr", "q_SD*b_tr/2", ("~b_tr", "~tributary", "~half")),
    Row(TRIBUTARY, "q_L*b_tr", "q_L*b_tr/2", ("~b_tr", "~tributary", "~half")),
    Row(TRIBUTARY, "q_L*b_tr", "q_L*b_tr*2", ("~b_tr", "~tributary", "~double", "~twice")),
    Row(TRIBUTARY, "q_fl*b_tr", "q_fl*b_tr/2", ("~b_tr", "~tributary", "~half")),
    Row(TRIBUTARY, "s_b", "s_b/2", ("~s_b", "~tributary", "~half")),
    Row(CLEAR, M_M1, "w_s*l_n**2/8 - (M_h1)/2", ("l_n & l", "~clear")),
    Row(CLEAR, M_M12, "w_s*l_n**2/8 - (M_h1 + M_h2)/2", ("l_n & l", "~clear")),
    Row(CLEAR, "w_s*l**2/8", "w_s*l_n**2/8", ("l_n & l", "~clear")),
    Row(CLEAR, DELTA_1, "5*l_n**2/(48*E_c*I_ea)*(M_m - 0.1*M_h)", ("l_n & l", "~clear")),
    Row(CLEAR, DELTA_0, "5*l_n**2/(48*E_c*I_e)*M_m", ("l_n & l", "~clear")),
    Row(CLEAR, "l_n/k_D", "l/k_D", ("l_n & l", "~clear", "~centre")),
    Row(CLEAR, "w_f*l/2", "w_f*l_n/2", ("l_n & l", "~clear")),
    Row(CLEAR, "w_f*l**2/16", "w_f*l_n**2/16", ("l_n & l", "~clear")),
    Row(SIMPLE, M_SPAN, "w_f*l**2/8", ("~simple", "~l\\*\\*2/8", "~l²/8", "~l2/8")),
    Row(SIMPLE, M_SAG, "w_f*l**2/8", ("~simple", "~l\\*\\*2/8", "~l²/8", "~l2/8")),
    Row(SIMPLE, M_M1, "w_s*l**2/8", ("~simple", "~left out & M_h1", "~8")),
    Row(SIMPLE, M_M2, "w_s*l**2/8", ("~simple", "~left out & M_h2", "~8")),
    Row(SIMPLE, M_M12, "w_s*l**2/8", ("~simple", "~M_h1 & M_h2", "~8")),
    Row(FACE, M_HOG, "-M_sn", ("~centre", "~face", "~M_sn")),
    Row(FACE, "V_sn - w_f*x_f", "V_sn", ("~centre", "~face", "~V_sn")),
    Row(FACE, "b_sn/2 + d_v", "d_v", ("~centre", "~face", "~b_sn")),
    Row(SIDE, V_SN12, "w_f*l/2 + (M_sn - M_sf)/l", ("~M_sf & M_sn", "~sign", "~left")),
    Row(SIDE, M_M12, "w_s*l**2/8 - (M_h1 + M_h1)/2", ("~M_h1 & M_h2", "~left", "~right")),
    Row(SIDE, M_M12, "w_s*l**2/8 - (M_h2 + M_h2)/2", ("~M_h1 & M_h2", "~left", "~right")),
    Row(EDITION, "0.5*f_r", "f_r", ("~edition", "~0.5", "~half")),
    Row(EDITION, V_C, "0.6*lambda_*beta*min(1.0*sqrt(f_c), 8)*b_w*d_v", ("0.6", "phi_c")),
    Row(EDITION, M_RF, "alpha_1*0.6*f_c*b*h_f*(d - h_f/2)", ("0.6", "phi_c")),
    Row(STANDARD, "4500*sqrt(f_c)", "4700*sqrt(f_c)", ("~4700", "~ACI")),
    Row(STANDARD, "0.6*lambda_*sqrt(f_c)", "0.62*lambda_*sqrt(f_c)", ("~0.62", "~ACI")),
    Row(STANDARD, "max(0.85 - 0.0015*f_c, 0.67)", "0.85", ("~0.85", "~ACI")),
    Row(STANDARD, "max(0.97 - 0.0025*f_c, 0.67)", "0.85", ("~0.85", "~ACI")),
    Row(STANDARD, A, "phi_s*A_s*f_y/(0.85*phi_c*f_c*b)", ("~0.85", "~ACI")),
    Row(STANDARD, A_SMIN, "0.25*sqrt(f_c)*b_t*h/f_y", ("~0.25", "~ACI")),
    Row(STANDARD, V_S, "phi_s*A_v*f_y*d_v/s", ("~45", "~ACI", "~cot", "~theta")),
    Row(STANDARD, "1.25*w_D + 1.5*w_L", "1.2*w_D + 1.6*w_L", ("~1.2 & 1.6", "~ACI")),
    Row(STANDARD, "700/(700 + f_y)", "600/(600 + f_y)", ("~600", "~ACI")),
    Row(STANDARD, "d*eps_cu/(eps_cu + f_y/E_s)", "d*0.003/(0.003 + f_y/E_s)", ("~0.003", "~ACI")),
)  # fmt: skip
