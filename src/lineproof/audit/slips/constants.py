"""Constants of other editions and other standards, and other rows of the tables, each with source.

All of this is an auditor's memory of what the other documents print. It serves to recognise where
a wrong number comes from; no value here enters a calculation.
"""

from __future__ import annotations

import math
from typing import NamedTuple


class Other(NamedTuple):
    """Another value for a constant or a looked-up value, in internal units, and where it stands."""

    value: float
    source: str

    @property
    def is_published(self) -> bool:
        """Tell whether another document prints it for the same thing, which its source names."""
        return any(name in self.source for name in _DOCUMENTS)


_DOCUMENTS = ("ACI 318", "A23.3-", "Eurocode", "NBC", "AASHTO")
_ACI = "ACI 318M"
_94 = "A23.3-94"
_84 = "A23.3-M84 and older"
_EC = "Eurocode 2"
_HALF = "9.8.2.3, for deflections only"
_SIMPLE = "simplified method"


def _others(*rows: tuple[float, str]) -> tuple[Other, ...]:
    return tuple(Other(*row) for row in rows)


IN_FORMULAS: dict[tuple[str, str], tuple[Other, ...]] = {
    ("E_c", "4500"): _others(
        (4700, _ACI), (4733, "57 000 in psi, ACI 318"), (5000, _84), (4750, "rounded")
    ),
    ("f_r", "0.6"): _others(
        (0.62, _ACI), (0.6228, "7.5 in psi, ACI 318"), (0.3, _HALF), (0.7, "older ACI 318M")
    ),
    ("f_rd", "0.5"): _others((1.0, "A23.3-04")),
    ("alpha_1", "0.85"): _others((0.8, "rounded")),
    ("alpha_1", "0.0015"): _others((0.0025, "the line of beta_1")),
    ("beta_1", "0.97"): _others((0.85, "the line of alpha_1, or ACI 318M")),
    ("beta_1", "0.0025"): _others((0.0015, "the line of alpha_1")),
    ("c_d", "700"): _others((600, "strain 0.003 of ACI 318M")),
    ("A_smin", "0.2"): _others((0.25, _ACI), (0.22, "another rule")),
    ("A_vmin", "0.06"): _others((0.062, _ACI), (0.08, _EC)),
    ("s_v", "0.06"): _others((0.062, _ACI), (0.08, _EC)),
    ("V_rmax", "0.25"): _others((0.2, _94), (0.125, "11.3.8.3"), (0.3, "another rule")),
    ("d_v", "0.9"): _others((0.8, "older rule"), (1.0, _ACI)),
    ("d_v", "0.72"): _others((0.8, "11.2.10 for walls"), (0.7, "rounded")),
    ("s_max", "0.7"): _others((0.5, _ACI), (0.35, "11.3.8.3, halved"), (0.75, _EC)),
    ("s_max", "600"): _others((300, "11.3.8.3, halved"), (500, "another rule")),
    ("beta", "0.40"): _others((0.18, _SIMPLE)),
    ("beta", "1500"): _others((750, "ACI 318M, strain at the bars")),
    ("beta", "1300"): _others((1000, "the simplified method")),
    ("beta", "1000"): _others((1300, "numerator of the general method"), (1275, "rounded")),
    ("beta", "230"): _others((260, _94)),
    ("theta", "29"): _others((35, _SIMPLE)),
    ("theta", "7000"): _others((3500, "AASHTO LRFD, strain at the bars"), (1500, "line of beta")),
    ("b_o", "10"): _others((5, "span/5, simple span"), (12, "span/12, L section"), (8, _ACI)),
    ("b_o", "5"): _others((10, "span/10, continuous"), (12, "span/12, L section"), (8, _ACI)),
    ("b_o", "12"): _others((6, "L section"), (8, _ACI), (10, "T section")),
    ("b_o", "6"): _others((12, "T section"), (8, _ACI)),
    ("b_t", "2.5"): _others((1.5, "flange on one side"), (2.0, _ACI)),
    ("b_t", "1.5"): _others((2.5, "flange on both sides"), (2.0, _ACI)),
    ("s_min", "1.4"): _others((1.0, _ACI), (1.33, _ACI)),
    ("s_min", "30"): _others((25, _ACI), (20, _EC)),
    ("f_s", "0.6"): _others((2 / 3, _ACI), (0.5, "another allowance")),
    ("T_cr", "0.38"): _others((0.33, _ACI), (0.4, _94)),
    ("l_d0", "0.45"): _others((0.6, "12.2.3, other cases"), (0.48, _ACI)),
    ("l_d0", "0.6"): _others((0.45, "12.2.3, well placed bars"), (0.48, _ACI)),
    ("l_d0", "0.60"): _others((0.45, "12.2.3, well placed bars"), (0.48, _ACI)),
    ("l_d0", "1.15"): _others((1.0, "rounded"), (0.9, _ACI)),
    ("l_d0", "2.5"): _others((1.5, "another rule")),
    ("l_s", "1.3"): _others(
        (1.0, "class A lap"), (1.7, "older class C lap"), (1.4, "another rule")
    ),
    ("l_hb", "100"): _others((105, "rounded"), (120, "another rule")),
    ("K_tr", "10.5"): _others((10, "rounded"), (41.4, _ACI)),
    ("A_so", "0.004"): _others((0.002, "slab steel"), (0.0018, "slab steel of ACI 318M")),
    ("B_r", "0.85"): _others((0.65, "a phi_c more"), (0.6, _84)),
    ("d_cs", "2"): _others((1.0, "half of the spacing by ACI 318M, doubled")),
    ("I_ea", "0.85"): _others((0.7, "both ends continuous"), (0.5, _ACI)),
    ("I_ea", "0.7"): _others((0.85, "one end continuous"), (0.5, _ACI)),
    ("l_co", "12"): _others((15, _84), (10, "another rule")),
    ("l_e", "12"): _others((15, _84), (10, "another rule")),
    ("T_fr", "0.67"): _others((1.0, "not reduced"), (0.25, "11.2.9.1")),
}
"""By symbol of the line and constant as written."""

_LOADS = {
    "1.25": _others((1.2, _ACI), (1.35, _EC), (1.4, "ACI 318 before 2002, or dead load alone")),
    "1.5": _others((1.6, _ACI), (1.7, "ACI 318 before 2002")),
    "0.9": _others((1.0, "no factor"), (0.85, "NBC 1995")),
    "1.4": _others((1.25, "load case 2"), (1.2, _ACI)),
}
"""Load factors, wherever they multiply a load or its effect."""

LOAD_PAIRS = (
    (1.2, 1.6, _ACI), (1.4, 1.7, "ACI 318 before 2002"), (1.35, 1.5, _EC),
    (1.5, 1.25, "the two exchanged"), (1.4, 1.4, "one factor for the whole"),
    (1.4, 0.0, "dead load alone, case 1"), (1.0, 1.5, "the dead load not factored"),
)  # fmt: skip
"""Factors of dead and of live load that are used together elsewhere."""

BY_SYMBOL: dict[str, tuple[Other, ...]] = {
    "phi_c": _others((0.6, _94), (0.7, "precast, 16.1.3"), (0.75, "shear, ACI 318M"),
                     (0.9, "member factor of ACI 318M"), (1 / 1.5, _EC)),
    "phi_s": _others((0.9, "member factor of ACI 318M"), (0.87, _EC), (0.65, "that of concrete")),
    "alpha_1": _others((0.85, _ACI), (0.8, "rounded")),
    "beta_1": _others((0.85, _ACI), (0.8, _EC), (0.9, "rounded")),
    "lambda_": _others((0.75, "8.6.5, low density"), (0.85, "8.6.5, semi-low density"),
                       (1.0, "8.6.5, normal density")),
    "eps_cu": _others((0.003, _ACI)),
    "E_s": _others((210_000, "another table"), (205_000, "another table")),
    "beta": _others((0.18, "11.3.6.3"), (0.21, "11.3.6.2"), (0.2, _94), (0.17, _ACI)),
    "theta": _others((35.0, "11.3.6.3"), (45.0, _ACI), (42.0, "11.3.6.2"), (30.0, "another rule")),
    "gamma_w": _others((23.5e-6, "plain concrete"), (25e-6, _EC), (23.6e-6, _ACI), (24e-6, "NBC")),
}  # fmt: skip
"""What other documents say of a value with a symbol of its own."""

ROWS: dict[str, tuple[float, ...]] = {
    "k_1": (1.0, 1.3), "k_2": (1.0, 1.2, 1.5), "k_3": (1.0, 1.2, 1.3), "k_4": (0.8, 1.0),
    "S_t": (1.0, 1.2, 1.4, 2.0), "S_ta": (1.0, 1.2, 1.4, 2.0), "k_D": (180.0, 240.0, 360.0, 480.0),
    "z_max": (25_000.0, 30_000.0), "mu": (0.6, 1.0, 1.4), "c_v": (0.25, 0.5, 1.0),
    "k_hc": (0.7, 1.0), "k_ht": (0.8, 1.0), "k_hd": (1.0, 1.3), "k_he": (1.0, 1.2),
    "q_L": (1.0e-3, 1.9e-3, 2.4e-3, 2.9e-3, 3.6e-3, 4.8e-3, 6.0e-3, 7.2e-3, 12.0e-3),
}  # fmt: skip
"""Other rows of the table that a looked-up value was read from, in internal units."""

GRADES: dict[str, tuple[float, ...]] = {
    "f_c": (20.0, 25.0, 30.0, 32.0, 35.0, 40.0, 45.0, 50.0, 60.0),
    "f_y": (300.0, 350.0, 400.0, 414.0, 420.0, 500.0),
    "f_yt": (300.0, 400.0, 500.0),
}
"""Strengths that are ordered, in MPa."""

BARS: tuple[tuple[str, float, float], ...] = (
    ("10M", 11.3, 100.0), ("15M", 16.0, 200.0), ("20M", 19.5, 300.0), ("25M", 25.2, 500.0),
    ("30M", 29.9, 700.0), ("35M", 35.7, 1000.0),
)  # fmt: skip
"""Bars of G30.18: size, diameter in mm, area in mm2."""


def source_of(symbol: str, value: float) -> str:
    """Return where a value for a looked-up symbol stands, if it is one known here, else ""."""
    others = (other for other in BY_SYMBOL.get(symbol, ()) if math.isclose(other.value, value))
    found = next(others, None)
    if found is not None:
        return found.source
    rows = (row for row in ROWS.get(symbol, ()) if math.isclose(row, value))
    return "another row of the table" if next(rows, None) is not None else ""


def of_constant(symbol: str, text: str, *, is_load: bool) -> tuple[Other, ...]:
    """Return the other values for a constant in the formula of a symbol."""
    own = IN_FORMULAS.get((symbol, text), ())
    return own + (_LOADS.get(text, ()) if is_load else ())
