"""Notation of loads."""

from __future__ import annotations

from lineproof.formula import Notation, Symbol

_ROWS = (
    ("gamma_w", "γ", "w", "", "unit weight of reinforced concrete", "kN/m3"),
    ("q_SD", "q", "SD", "", "superimposed dead load", "kPa"),
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
    ("V_f", "V", "f", "", "shear due to factored loads at the support", "kN"),
    ("R_D", "R", "D", "", "reaction due to dead load, unfactored", "kN"),
    ("R_L", "R", "L", "", "reaction due to live load, unfactored", "kN"),
)  # fmt: skip

NOTATION = Notation(Symbol(*row) for row in _ROWS)
