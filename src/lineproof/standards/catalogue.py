"""The whole catalogue, for walking through it: tests, the list of what a calc may use."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TypeVar

from lineproof.formula import Criterion, Formula, Notation
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3 import (
    analysis,
    bars,
    bearing,
    capacity,
    compression_steel,
    cover,
    crack_control,
    cutoff,
    deflection,
    deflection_stages,
    development,
    flange,
    flexure,
    hooks,
    interface,
    laps,
    materials,
    minimum,
    shear,
    shear_bars,
    shear_factors,
    strain,
    strain_closing,
    stress_block,
    torsion,
)
from lineproof.standards.a23_3.notation import NOTATION as A23_3
from lineproof.standards.nbc import combinations, loads, reduction
from lineproof.standards.nbc.notation import NOTATION as NBC

Kind = TypeVar("Kind", Formula, LookupTable)

NOTATION: Notation = A23_3 | NBC
"""Every symbol of the catalogue."""

_MODULES = (
    materials, stress_block, flange, flexure, compression_steel, minimum, crack_control,
    capacity, bars, cover, strain, strain_closing, loads, combinations, reduction, analysis,
    shear, shear_factors, shear_bars, torsion, interface, bearing, deflection,
    deflection_stages, development, hooks, laps, cutoff,
)  # fmt: skip


def formulas() -> Iterator[tuple[str, Formula]]:
    """Give every formula with its place, ``module.NAME``."""
    yield from _named(Formula)


def criteria() -> Iterator[tuple[str, Criterion]]:
    """Give every criterion with its place; those without a name by module and key."""
    for module in _MODULES:
        names = {id(v): n for n, v in vars(module).items() if isinstance(v, Criterion)}
        for number, test in enumerate(getattr(module, "CRITERIA", ())):
            yield f"{_short(module.__name__)}.{names.get(id(test), f'{test.key} {number}')}", test


def tables() -> Iterator[tuple[str, LookupTable]]:
    """Give every look-up table with its place."""
    yield from _named(LookupTable)


def _named(kind: type[Kind]) -> Iterator[tuple[str, Kind]]:
    for module in _MODULES:
        for name, value in vars(module).items():
            if isinstance(value, kind) and not name.startswith("_"):
                yield f"{_short(module.__name__)}.{name}", value


def _short(module: str) -> str:
    return module.rpartition(".")[2]
