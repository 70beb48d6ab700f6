"""Clause 8: materials, resistance factors, modulus of rupture, modulus of elasticity."""

from __future__ import annotations

from functools import partial

from lineproof.formula import FROM_MEMORY, criterion, formula
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import BENTZ_2006, F_R_QUOTED

_formula = partial(formula, notation=NOTATION)
_criterion = partial(criterion, notation=NOTATION)

LEAST_F_C, MOST_F_C = 20.0, 80.0
"""Range of f'c [MPa], 8.6.1.1 (from memory)."""

RESISTANCE_FACTORS = LookupTable(
    "Resistance factors",
    "material",
    {"phi_c": "", "phi_s": ""},
    {"cast in place": {"phi_c": "0.65", "phi_s": "0.85"}},
    "A23.3, 8.4.2 and 8.4.3",
    clause="8.4",
    basis=BENTZ_2006,
    clauses={"phi_c": "8.4.2", "phi_s": "8.4.3"},
)
DENSITY_FACTORS = LookupTable(
    "Factor for low-density concrete",
    "density of concrete",
    {"lambda_": ""},
    {
        "normal": {"lambda_": "1.00"},
        "semi-low": {"lambda_": "0.85"},
        "low": {"lambda_": "0.75"},
    },
    "A23.3, 8.6.5",
    clause="8.6.5",
    basis=FROM_MEMORY,
)
CONSTANTS = LookupTable(
    "Constants of the standard",
    "constant",
    {"E_s": "MPa", "eps_cu": ""},
    {"reinforcement": {"E_s": "200000"}, "concrete": {"eps_cu": "0.0035"}},
    "A23.3, 8.5.4.1 and 10.1.3",
    clause="8.5.4.1, 10.1.3",
    basis=FROM_MEMORY,
    clauses={"E_s": "8.5.4.1", "eps_cu": "10.1.3"},
)

E_C_NORMAL = _formula(
    "E_c = 4500*sqrt(f_c)",
    clause="8.6.2.3",
    title="Modulus of elasticity, normal density",
    basis=FROM_MEMORY,
    numbers={"4500": "MPa^0.5"},
)
E_C_GENERAL = _formula(
    "E_c = (3300*sqrt(f_c) + 6900)*(gamma_c/2300)**1.5",
    clause="8.6.2.2",
    title="Modulus of elasticity, general",
    basis=FROM_MEMORY,
    numbers={"3300": "MPa^0.5", "6900": "MPa", "2300": "kg/m3"},
)
E_C_RULE = _criterion(
    "f_c <= 40",
    clause="8.6.2.3",
    title="Which expression gives the modulus of elasticity",
    basis=FROM_MEMORY,
    numbers={"40": "MPa"},
    yes="Normal density and at most 40 MPa: the short expression applies.",
    no="Above 40 MPa the general expression applies.",
    key="short-E_c",
)
F_R = _formula(
    "f_r = 0.6*lambda_*sqrt(f_c)",
    clause="8.6.4",
    title="Modulus of rupture",
    basis=F_R_QUOTED,
    numbers={"0.6": "MPa^0.5"},
)

FORMULAS = (E_C_NORMAL, E_C_GENERAL, F_R)
CRITERIA = (E_C_RULE,)
TABLES = (RESISTANCE_FACTORS, DENSITY_FACTORS, CONSTANTS)
