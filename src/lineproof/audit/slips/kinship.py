"""Which quantities are taken for each other: pairs that checkers meet again and again."""

from __future__ import annotations

_PAIRS = """
d h | d d_v | h d_v | b b_w | b b_f | b_w b_f | b_t b_w | b_t b_f | b_t b | b_f b_o | b_w b_o
A_t A_v | A_t A_s | A_v A_vmin | A_bs A_b | A_bs A_tr | A_s A_sp | A_s A_sr | A_s A_smin | A_s A_b
A_s A_sd | A_s1 A_s2 | A_s A_s1 | A_sr A_smin | A_o A_oh | A_c A_oh | A_c A_g | A_1 A_2
d_b d_bs | d_b d_b2 | d_1 d_2 | d d_1 | d d_2 | d d_p | d_c d_s | c_c c_b1 | c_c d_c | d_cn d_cs
d_cn d_c | c_c d_cn | s_c s_bb | s_c s_min | s s_max | s s_v | s s_c | s s_b | r_s d_bs
phi_c phi_s | alpha_1 beta_1 | E_c E_s | f_c f_y | f_y f_yt | f_r f_rd | f_c f_r | f_s f_y
y_b y_t | y_b h | I_g I_cr | I_g I_gw | I_cr I_e | I_g I_e | I_em I_ec | I_e1 I_e2 | I_em I_ea
M_cr M_crn | M_crd M_crdn | M_cr M_crd | M_crn M_crdn | M_f M_sn | M_f M_r | M_sn M_sf | M_m M_h
M_m M_h1 | M_m M_h2 | M_h1 M_h2 | M_r M_l | V_f V_sn | V_f V_r | V_c V_s | V_r V_rmax | V_s V_r
V_f V_c | V_f V_s | V_f V_fe | V_f V_le | V_f V_fr | w_D w_L | w_f w_D | w_f w_L | w_s w_D | w_s w_L
w_sl w_SD | w_sl w_wb | w_wb w_SD | q_SD q_L | R_D R_L | M_D M_L | n_1 n_2 | n_b n_1 | n_t n_o
n_b n_v | n_b n_t | n_1 n_t | c a | a kd | c kd | a h_f | h h_f | d h_f | a a_r | c d | c_d c
b_sl b_sr | b_sn b_sl | b_sn b_sr | zeta_s zeta_sa | S_t S_ta | delta_D delta_DL | delta_sus delta_D
delta_L delta_Lr | delta_sus delta_DL | p_c p_h | T_f T_cr | T_f T_fr | F_lt F_lc | l_d l_d0
l_d l_s | l_d l_hb | x_f x_n | x_f b_sn | x_e x_t | x_t x_co | x_e x_co | a_t a_v | t_D t_L
beta beta_g | theta theta_g | d_v l_b | b_s b_w | l_w s_b | l_w l | h_f b_o | k_1 k_4 | k_3 k_4
d a | t_f T_f | A_vf A_s | n_E n_1 | l l_n | l l_1 | l l_2 | f_c alpha_1
"""
PAIRS = frozenset(
    frozenset(pair.split()) for line in _PAIRS.split("\n") for pair in line.split("|")
)
"""Pairs of symbols, without the number of their place, that are mixed up in practice."""

PARTNERS: dict[str, tuple[str, ...]] = {
    symbol: tuple(sorted({other for pair in PAIRS if symbol in pair for other in pair - {symbol}}))
    for symbol in sorted({one for pair in PAIRS for one in pair})
}
"""By symbol, those that it is taken for."""

SERVICE: dict[str, tuple[str, ...]] = {
    "w_s": ("w_f",), "M_m": ("M_f",), "M_a": ("M_f",), "M_h": ("M_f",), "M_h1": ("M_f",),
    "M_h2": ("M_f",), "w_f": ("w_s",), "M_f": ("M_m", "M_h1", "M_h2"),
}  # fmt: skip
"""Specified loads and their effects, and the factored ones of the same span; and the reverse."""
