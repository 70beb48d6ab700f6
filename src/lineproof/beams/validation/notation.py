"""Symbols of the validation beside those of the standard."""

from __future__ import annotations

from lineproof.formula import Notation, Symbol
from lineproof.standards.catalogue import NOTATION as CATALOGUE

_ROWS = (
    # id, base, sub, sup, meaning, printed unit
    ("rho", "ρ", "", "", "ratio of tension reinforcement", ""),
    ("rho_b", "ρ", "b", "", "ratio of balanced reinforcement, per cent", ""),
    ("K_r", "K", "r", "", "moment over b d²", "MPa"),
    ("M_12", "M", "1.2", "", "1.2 times the cracking moment", "kN.m"),
    ("M_u", "M", "u", "", "0.9 times the nominal moment", "kN.m"),
    ("A_sf", "A", "sf", "", "area of bars balanced by the overhanging flanges", "mm2"),
    ("A_cc", "A", "cc", "", "area of concrete in compression", "mm2"),
    ("j_d", "j", "d", "", "lever arm", "mm"),
    ("eps_sp", "ε", "s", "′", "strain of the compression bars", ""),
    ("A_tr1", "A", "n", "", "area of the bars, transformed", "mm2"),
    ("f_ct", "f", "ct", "", "stress at the top of the concrete, cracked section", "MPa"),
    ("f_st", "f", "st", "", "stress in the bars, cracked section", "MPa"),
    ("V_u", "V", "u", "", "shear of the case, over the member factor 0.75 in the sums", "kN"),
    ("V_c1", "V", "c1", "", "0.75 times the shear resistance of the concrete", "kN"),
    ("V_c2", "V", "c2", "", "0.5 × 0.75 times the shear resistance of the concrete", "kN"),
    ("V_c3", "V", "c3", "", "3 × 0.75 times the shear resistance of the concrete", "kN"),
    ("V_c5", "V", "c5", "", "5 × 0.75 times the shear resistance of the concrete", "kN"),
    ("A_v45", "A", "v,45", "", "area of stirrup legs that the shear requires, 45 degrees", "mm2"),
    ("l_h15", "ℓ", "h15", "", "basic development length of a hook, 15M", "mm"),
    ("l_h20", "ℓ", "h20", "", "basic development length of a hook, 20M", "mm"),
    ("l_h25", "ℓ", "h25", "", "basic development length of a hook, 25M", "mm"),
    ("d_b15", "d", "b15", "", "diameter of the bar, 15M", "mm"),
    ("d_b20", "d", "b20", "", "diameter of the bar, 20M", "mm"),
    ("d_b25", "d", "b25", "", "diameter of the bar, 25M", "mm"),
    ("z_maxe", "z", "max,e", "", "largest allowed z, exterior exposure", "N/mm"),
    ("w", "w", "", "", "uniform load", "kN/m"),
    ("P", "P", "", "", "point load at midspan", "kN"),
    ("x_p1", "x", "1", "", "start of the partial load from the left support", "m"),
    ("x_p2", "x", "2", "", "end of the partial load from the left support", "m"),
    ("I_k", "I", "k", "", "moment of inertia of the span", "mm4"),
    ("theta_0", "θ", "0", "", "slope at the left end", ""),
    ("R_A", "R", "A", "", "reaction at the left support", "kN"),
    ("R_B", "R", "B", "", "reaction at the middle support", "kN"),
    ("R_C", "R", "C", "", "reaction at the right support", "kN"),
    ("R_1", "R", "1", "", "reaction at the first support", "kN"),
    ("R_2", "R", "2", "", "reaction at the second support", "kN"),
    *((f"M_s{n}", "M", f"s{n}", "", f"moment over interior support {n}", "kN.m")
      for n in range(1, 5)),
    *((f"M_x{n}", "M", f"x{n}", "", f"largest moment in span {n}", "kN.m") for n in range(1, 4)),
    *((f"V_l{n}", "V", f"ℓ{n}", "", f"shear at the left end of span {n}", "kN")
      for n in range(1, 4)),
    *((f"V_r{n}", "V", f"r{n}", "", f"shear at the right end of span {n}, reversed", "kN")
      for n in range(1, 4)),
    *((f"x_m{n}", "x", f"m{n}", "", f"place of the largest moment in span {n}", "m")
      for n in range(1, 4)),
    *((f"x_i{n}", "x", f"i{n}", "", f"first point of no moment in span {n}", "m")
      for n in range(1, 4)),
    *((f"k_M{n}", "k", f"M{n}", "", f"divisor of the approximate moment, row {n}", "")
      for n in range(1, 9)),
    *((f"k_V{n}", "k", f"V{n}", "", f"factor of the approximate shear, row {n}", "")
      for n in range(1, 3)),
    # tests
    ("l_v", "ℓ", "v", "", "shear span: load to support", "mm"),
    ("n_30", "n", "30", "", "number of bars M30", ""),
    ("n_25", "n", "25", "", "number of bars M25", ""),
    ("A_30", "A", "30", "", "area of one bar M30", "mm2"),
    ("A_25", "A", "25", "", "area of one bar M25", "mm2"),
    ("f_30", "f", "y30", "", "measured yield strength of the bars M30", "MPa"),
    ("f_25", "f", "y25", "", "measured yield strength of the bars M25", "MPa"),
    ("P_te", "P", "te", "", "largest load of the test, at midspan", "kN"),
    ("V_te", "V", "te", "", "largest shear of the test", "kN"),
    ("V_n", "V", "n", "", "shear strength by the general method", "kN"),
    ("V_m", "V", "m", "", "shear at which the moment resistance is reached", "kN"),
    ("V_p", "V", "p", "", "predicted shear", "kN"),
    ("M_t1", "M", "t1", "", "largest moment of the first twin", "kN.m"),
    ("M_t2", "M", "t2", "", "largest moment of the second twin", "kN.m"),
    ("M_te", "M", "te", "", "largest moment of the test, mean of the twins", "kN.m"),
    ("T_2", "T", "2", "", "tension in the upper bars", "kN"),
    *((f"r_{beam}", "r", beam, "", f"test over prediction, beam {beam}", "")
      for beam in ("OA1", "OA2", "OA3", "A1", "A2", "A3", "B1", "B2", "B3", "C1", "C2", "C3")),
    *((f"r_T{n}", "r", f"T{n}", "", f"test over prediction, bending test C4-{n}", "")
      for n in range(1, 4)),
    *((f"{letter}_{name}", base, sub, "", f"{what}, {which}", "")
      for letter, base, what in (
        ("s", "s", "sum of test over prediction"), ("m", "m", "mean of test over prediction"),
        ("q", "q", "sum of the squared differences from the mean"),
        ("v", "v", "coefficient of variation"))
      for name, sub, which in (
        ("all", "all", "all shear tests"), ("pl", "p", "without stirrups"),
        ("st", "s", "with stirrups"), ("M", "M", "bending tests"))),
)  # fmt: skip

OWN = Notation(Symbol(*row) for row in _ROWS)
"""None of them is a symbol of the catalogue; a test holds them apart."""
PUBLISHED = "_pub"
"""Ends the id of a published value."""


def _published(symbol: Symbol) -> Symbol:
    sub = ",".join(part for part in (symbol.sub, "pub") if part)
    meaning = f"published: {symbol.meaning}"
    return Symbol(symbol.id + PUBLISHED, symbol.base, sub, symbol.sup, meaning, symbol.unit)


def notation_for(symbols: frozenset[str]) -> Notation:
    """Return the catalogue's symbols, those of the validation, and the published of ``symbols``."""
    known = {**CATALOGUE, **OWN}
    published = (_published(known[name]) for name in sorted(symbols))
    return Notation([*known.values(), *published])
