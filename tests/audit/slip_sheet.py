"""A beam of round numbers for the tests of the slip finder, and claims typed against it.

T section 350 x 600 with a flange of 1500 x 150, four bars of 500 mm2, f'c 30, f_y 400, density
factor 0.85; spans of 8 m and 6 m, loads of 4 and 5 kPa on 3 m.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from functools import cache

from lineproof.audit.data import Claim, Interval, Slip, read_from
from lineproof.audit.graph import Graph
from lineproof.audit.slips.search import find_slips
from lineproof.formula import formula
from lineproof.quantity.units import internal_factor
from lineproof.sheet import Sheet

GIVEN = {
    "l_1": "8 m", "l_2": "6 m", "h": "600 mm", "b_w": "350 mm", "b_f": "1500 mm", "h_f": "150 mm",
    "s_b": "3 m", "b_s1": "400 mm", "f_c": "30 MPa", "f_y": "400 MPa", "phi_c": "0.65",
    "phi_s": "0.85", "lambda_": "0.85", "alpha_1": "0.805", "beta": "0.18", "theta": "35 deg",
    "d_b": "25.2 mm", "d_bs": "11.3 mm", "A_b": "500 mm2", "n_1": "4", "A_t": "100 mm2",
    "n_v": "2", "c_c": "40 mm", "q_D": "4 kPa", "q_L": "5 kPa",
}  # fmt: skip
PARTS: dict[str, tuple[Mapping[str, str], Mapping[str, str]]] = {
    "loads": ({}, {
        "b_tr = s_b": "m", "w_D1 = q_D*b_tr": "kN/m", "w_L1 = q_L*b_tr": "kN/m",
        "w_f = 1.25*w_D1 + 1.5*w_L1": "kN/m", "w_s = w_D1 + w_L1": "kN/m",
    }),
    "span-1": ({}, {"l_n = l_1 - b_s1": "m", "A_g = b_w*h + (b_f - b_w)*h_f": "mm2"}),
    "sag-1": ({"M_sf": "-227.2 kN.m"}, {
        "V_sn = w_f*l_1/2 + M_sf/l_1": "kN", "x_f = V_sn/w_f": "m",
        "M_f = V_sn*x_f - w_f*x_f**2/2": "kN.m", "d = h - c_c - d_bs - d_b/2": "mm",
        "A_s = n_1*A_b": "mm2", "a = phi_s*A_s*f_y/(alpha_1*phi_c*f_c*b_f)": "mm",
        "M_r = phi_s*A_s*f_y*(d - a/2)": "kN.m", "A_smin = 0.2*sqrt(f_c)*b_w*h/f_y": "mm2",
        "b_o = min(l_1/10, 12*h_f)": "mm", "I_g = b_w*h**3/12": "mm4",
    }),
    "hog-2-left": ({"M_sn": "-300 kN.m", "V_sn": "180 kN"}, {
        "x_f = b_s1/2": "mm", "M_f = -(M_sn + V_sn*x_f - w_f*x_f**2/2)": "kN.m",
    }),
    "hog-2-right": ({"M_sn": "-280 kN.m", "V_sn": "150 kN"}, {
        "x_f = b_s1/2": "mm", "M_f = -(M_sn + V_sn*x_f - w_f*x_f**2/2)": "kN.m",
    }),
    "shear-1-left": ({"s": "250 mm", "d_v": "480 mm"}, {
        "A_v = n_v*A_t": "mm2", "V_c = phi_c*lambda_*beta*1.0*sqrt(f_c)*b_w*d_v": "kN",
        "V_s = phi_s*A_v*f_y*d_v*cot(theta)/s": "kN",
    }),
    "shear-1-right": ({"s": "300 mm", "d_v": "480 mm", "A_v": "200 mm2"}, {
        "V_s = phi_s*A_v*f_y*d_v*cot(theta)/s": "kN",
    }),
}  # fmt: skip

IN_METRES = ("metres", "M_o = w_f*l_2**2/8")
"""Part and line that a hand works in kN and m."""
MATERIALS = {
    "E_c = 4500*sqrt(f_c)": ("MPa", {"4500": "MPa^0.5"}),
    "c_d = 700/(700 + f_y)": ("", {"700": "MPa"}),
}
"""Lines with constants that other standards print otherwise, and the units of these."""
EMPIRICAL = ("0.2", "1.0")
"""Constants before the root of a stress: they carry its unit."""


@cache
def beam() -> Graph:
    """Return the graph of the beam, made once."""
    sheet = Sheet("S1", "Beam of round numbers")
    with sheet.part("given", "Given"):
        for symbol, typed in GIVEN.items():
            sheet.given(symbol, typed, title=f"given {symbol}")
    for key, (givens, lines) in PARTS.items():
        with sheet.part(key, key.replace("-", " ").capitalize()):
            for symbol, typed in givens.items():
                sheet.given(symbol, typed, title=f"{symbol} of {key}")
            for text, unit in lines.items():
                numbers = {n: "MPa^0.5" for n in EMPIRICAL if f"{n}*sqrt" in text}
                sheet.line(
                    formula(text, unit=unit, numbers=numbers, title=f"line of {text.split()[0]}")
                )
    with sheet.part(IN_METRES[0], "Worked in kN and m"):
        sheet.line(formula(IN_METRES[1], unit="kN.m", system="kN-m", title="line of M_o"))
    with sheet.part("materials", "Materials"):
        for text, (unit, numbers) in MATERIALS.items():
            title = f"line of {text.split()[0]}"
            sheet.line(formula(text, unit=unit, numbers=numbers, title=title))
    return Graph(sheet.close())


def claim_of(graph: Graph, entry_id: str, value: float, digits: int = 4) -> Claim:
    """Return a claim of a value in the printed unit of a line, rounded to so many digits."""
    unit = graph[entry_id].unit
    text = f"{float(f'{value:.{digits}g}'):.12f}".rstrip("0").rstrip(".")
    return typed(entry_id, text, unit)


def typed(entry_id: str, text: str, unit: str) -> Claim:
    """Return a claim as typed."""
    factor = internal_factor(unit)
    return Claim(entry_id, text, unit, float(text) * factor, read_from(text).times(factor))


def slips(
    entry_id: str,
    value: float,
    *,
    digits: int = 4,
    claimed: Iterable[str] | None = None,
    used: Mapping[str, Interval] | None = None,
    texts: Mapping[str, str] | None = None,
) -> tuple[Slip, ...]:
    """Return the slips behind a value claimed for a line of the beam, all lines being claimed.

    ``texts`` are numbers of other lines as they were typed.
    """
    graph = beam()
    whole = dict.fromkeys(graph.stored if claimed is None else claimed, "") | dict(texts or {})
    return find_slips(graph, entry_id, used or {}, claim_of(graph, entry_id, value, digits), whole)
