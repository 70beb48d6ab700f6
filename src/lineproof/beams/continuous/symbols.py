"""Symbols numbered by span, support and load, and formulas written for one beam.

A beam has as many spans as it has, so its statics cannot stand in a catalogue line by line: here
each formula is written out for the beam at hand, its units proved like any other.
"""

from __future__ import annotations

import re
from collections.abc import Iterable
from functools import lru_cache

from lineproof.formula import Criterion, Formula, Notation, Symbol, criterion, formula
from lineproof.formula.formula import System
from lineproof.formula.proof import prove, prove_criterion
from lineproof.standards.catalogue import NOTATION
from lineproof.standards.references import MECHANICS

KINDS = {"D": "dead load", "L": "live load", "L_st": "live load of storage", "S": "snow"}
"""Load types in words."""
_PATTERNS: tuple[tuple[re.Pattern[str], str], ...] = tuple(
    (re.compile(pattern), unit)
    for pattern, unit in (
        (r"l_\d+", "m"),
        (r"h_\d+", "mm"),
        (r"b_s\d+", "mm"),
        (r"I_\d+", "mm4"),
        (r"p_\d+", ""),
        (r"[nr]_[tc]\d+", ""),
        (r"A_[tc]\d\dM", "mm2"),
        (r"K_\d+", "mm3"),
        (r"w_(D|L|Lst|S)\d+", "kN/m"),
        (r"w_[xy]\d+", "kN/m"),
        (r"w_wb\d+|w_bm\d+", "kN/m"),
        (r"q_[xy]\d+", "kPa"),
        (r"b_[xy]\d+", "m"),
        (r"[hb]_c\d+[ab]", "mm"),
        (r"l_c\d+[ab]", "m"),
        (r"I_c\d+[ab]", "mm4"),
        (r"P_x\d+", "kN"),
        (r"[ase]_x\d+", "m"),
        (r"M_\d+[lr]?(D|S|L\d+|Lst\d+)", "kN.m"),
        (r"M_c\d+(D|S|L\d*|Lst\d*)|M_cm\d+(L|Lst)", "kN.m"),
        (r"T_c\d+(D|S|L|Lst)", "kN.m"),
        (r"t_(D|S|L|Lst)", "kN.m/m"),
        (r"R_\d+(D|S|L\d*|Lst\d*)", "kN"),
        (r"R_m\d+(L|Lst)|R_u\d+", "kN"),
        (r"[RW]_p\d+(D|S|L\d*|Lst\d*)", "kN"),
        (r"W_[df]\d+", "kN"),
        (r"F_\d+[ab](D|S|L\d+|Lst\d+)", "kN.m2"),
        (r"x_[ijs]", "m"),
        (r"[MT]_[ij]", "kN.m"),
        (r"V_[ij](e|\d+)?", "kN"),
        (r"M_q\d+[lr]", "kN.m"),
        (r"M_max|M_all", "kN.m"),
        (r"V_max", "kN"),
    )
)


def code(kind: str) -> str:
    """Return a load type as it stands in an id: ``L_st`` as ``Lst``."""
    return kind.replace("_", "")


def subscript(kind: str) -> str:
    """Return a load type as a subscript: ``L_st`` as ``L,st``."""
    return kind.replace("_", ",")


def letter(kind: str) -> str:
    """Return the letter of a load type, as combinations of loads name it: ``L_st`` as ``L``."""
    return kind.partition("_")[0]


@lru_cache(maxsize=4096)
def unit_of(name: str) -> str:
    """Return the unit of a numbered symbol or of one of the catalogue."""
    for pattern, unit in _PATTERNS:
        if pattern.fullmatch(name):
            return unit
    return NOTATION[name].unit


def numbered(name: str, base: str, sub: str, meaning: str) -> Symbol:
    """Return a symbol that carries the number of a span, a support or a load."""
    return Symbol(name, base, sub, "", meaning, unit_of(name))


def notation(symbols: Iterable[Symbol]) -> Notation:
    """Return numbered symbols as a notation; one that stands twice stands once."""
    return Notation({symbol.id: symbol for symbol in symbols}.values())


@lru_cache(maxsize=8192)
def stated(
    text: str, *, unit: str = "", title: str = "", clause: str = "statics", system: System = "kN-m"
) -> Formula:
    """Return a formula written for one beam, its units proved."""
    made = formula(
        text, unit=unit or unit_of(text.partition(" = ")[0]), title=title, clause=clause,
        basis=MECHANICS, system=system, notation=NOTATION,
    )  # fmt: skip
    prove(made, {name: unit_of(name) for name in made.names})
    return made


@lru_cache(maxsize=8192)
def stated_check(text: str, unit: str, *, title: str, yes: str, no: str, key: str) -> Criterion:
    """Return a criterion written for one beam, its units proved."""
    made = criterion(
        text, unit=unit, title=title, clause="statics", basis=MECHANICS, yes=yes, no=no, key=key,
        system="kN-m", notation=NOTATION,
    )  # fmt: skip
    prove_criterion(made, {name: unit_of(name) for name in made.names})
    return made


@lru_cache(maxsize=8192)
def required(
    text: str, unit: str, *, title: str, yes: str, key: str, clause: str = "statics"
) -> Criterion:
    """Return a criterion written for one beam, its units proved: it proves the calculation."""
    made = criterion(
        text, unit=unit, title=title, clause=clause, basis=MECHANICS, yes=yes, key=key,
        system="kN-m", notation=NOTATION, proof=True,
    )  # fmt: skip
    prove_criterion(made, {name: unit_of(name) for name in made.names})
    return made
