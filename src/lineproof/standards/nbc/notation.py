"""Notation of loads."""

from __future__ import annotations

from lineproof.formula import Notation, Symbol

_ROWS = (
    ("gamma_w", "γ", "w", "", "unit weight of reinforced concrete", "kN/m3"),
    ("q_SD", "q", "SD", "", "superimposed dead load", "kPa"),
    ("q_pt", "q", "pt", "", "allowance for partitions", "kPa"),
    ("q_ptmin", "q", "pt,min", "", "least allowance for partitions", "kPa"),
    ("w_pt", "w", "pt", "", "partitions on the tributary width", "kN/m"),
    ("q_S", "S", "", "", "specified snow load", "kPa"),
    ("q_cn", "q", "cn", "", "load of the construction stage", "kPa"),
    ("w_cn", "w", "cn", "", "load of the construction stage on the tributary width", "kN/m"),
    ("q_fl", "q", "fl", "", "weight of the floor carried", "kPa"),
    ("w_fl", "w", "fl", "", "weight of the floor carried, on the tributary width", "kN/m"),
    ("q_L", "q", "L", "", "specified live load", "kPa"),
    ("q_Lmin", "q", "L,min", "", "least specified live load of the use", "kPa"),
    ("w_sl", "w", "sl", "", "weight of the slab on the tributary width", "kN/m"),
    ("w_wb", "w", "wb", "", "weight of the web below the slab", "kN/m"),
    ("w_bm", "w", "bm", "", "weight of the beam", "kN/m"),
    ("w_SD", "w", "SD", "", "superimposed dead load on the tributary width", "kN/m"),
    ("w_D", "w", "D", "", "dead load", "kN/m"),
    ("w_L", "w", "L", "", "live load", "kN/m"),
    ("w_f1", "w", "f1", "", "factored load, case 1", "kN/m"),
    ("w_f2", "w", "f2", "", "factored load, case 2", "kN/m"),
    ("w_f", "w", "f", "", "factored load, largest case", "kN/m"),
    ("V_f", "V", "f", "", "shear due to factored loads", "kN"),
    ("R_D", "R", "D", "", "reaction due to dead load, unfactored", "kN"),
    ("R_L", "R", "L", "", "reaction due to live load, unfactored", "kN"),
    ("w_S", "w", "S", "", "snow load", "kN/m"),
    ("w_W", "w", "W", "", "wind load", "kN/m"),
    ("w_E", "w", "E", "", "earthquake load", "kN/m"),
    ("w_f3", "w", "f3", "", "factored load, case 3", "kN/m"),
    ("w_Df", "w", "Df", "", "factored dead load", "kN/m"),
    ("w_Lf", "w", "Lf", "", "factored live load", "kN/m"),
    ("w_s1", "w", "s1", "", "specified load, case 1", "kN/m"),
    ("w_s3", "w", "s3", "", "specified load, case 3", "kN/m"),
    ("w_sus", "w", "sus", "", "sustained load", "kN/m"),
    ("w_Ls", "w", "Ls", "", "sustained part of the live load", "kN/m"),
    ("w_Lt", "w", "Lt", "", "transient part of the live load", "kN/m"),
    ("r_Ls", "r", "Ls", "", "share of the live load that is sustained", ""),
    ("A_L", "A", "L", "", "tributary area of the use", "m2"),
    ("A_0", "A", "0", "", "reference area of the live load reduction", "m2"),
    ("A_Lmin", "A", "L,min", "", "tributary area above which live load may be reduced", "m2"),
    ("r_L", "r", "L", "", "live load reduction factor", ""),
)  # fmt: skip

NOTATION = Notation(Symbol(*row) for row in _ROWS)
