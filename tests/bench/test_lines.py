"""A recorded line against what a user would do instead."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import pint
import pytest
import sympy

from lineproof.formula import formula
from lineproof.sheet import Sheet

VALUES = {"phi_s": 0.85, "A_s": 2000.0, "f_y": 400.0, "d": 566.1, "a": 13.15}
UNITS = {"phi_s": "", "A_s": "mm2", "f_y": "MPa", "d": "mm", "a": "mm"}
LINES = 100
MOMENTS = [formula(f"M_{number} = phi_s*A_s*f_y*(d - a/2)", unit="kN.m") for number in range(LINES)]


def bare(phi_s: float, A_s: float, f_y: float, d: float, a: float) -> float:
    """The same arithmetic in bare floats."""
    return phi_s * A_s * f_y * (d - a / 2)


def sheet_with_values() -> Sheet:
    """Return a sheet on which the line's arguments stand."""
    sheet = Sheet("bench")
    with sheet.part("data", "Data"):
        for name, value in VALUES.items():
            sheet.given(name, f"{value} {UNITS[name]}".strip())
    return sheet


@pytest.mark.benchmark(group="one line")
def test_bare_floats(benchmark: Callable[..., Any]) -> None:
    """A hundred times the arithmetic of the line."""
    values = tuple(VALUES.values())

    def hundred() -> float:
        result = 0.0
        for _ in range(LINES):
            result = bare(*values)
        return result

    assert benchmark(hundred) == pytest.approx(380.45e6, rel=1e-4)


@pytest.mark.benchmark(group="one line")
def test_recorded_lines(benchmark: Callable[..., Any]) -> None:
    """A hundred recorded lines, each a formula with its own symbol."""
    sheet = sheet_with_values()

    def hundred() -> float:
        with sheet.part("flexure", "Flexure"):
            for moment in MOMENTS:
                made = sheet.line(moment)
        return float(made.value)

    assert benchmark(hundred) == pytest.approx(380.45e6, rel=1e-4)


@pytest.mark.benchmark(group="one line")
def test_plain_libraries(benchmark: Callable[..., Any]) -> None:
    """A hundred times sympy's subs and latex and pint's arithmetic, as one would write it."""
    ureg: Any = pint.UnitRegistry()
    symbols = {name: sympy.Symbol(name) for name in VALUES}
    s = symbols
    expression = s["phi_s"] * s["A_s"] * s["f_y"] * (s["d"] - s["a"] / 2)
    units = {"phi_s": "", "A_s": "mm**2", "f_y": "MPa", "d": "mm", "a": "mm"}
    quantities = {name: ureg.Quantity(value, units[name]) for name, value in VALUES.items()}

    def hundred() -> float:
        for _ in range(LINES):
            sympy.latex(expression)
            sympy.latex(expression.subs({symbols[n]: v for n, v in VALUES.items()}))
            q = quantities
            moment = (q["phi_s"] * q["A_s"] * q["f_y"] * (q["d"] - q["a"] / 2)).to("kN*m")
        return float(moment.magnitude)

    assert benchmark.pedantic(hundred, rounds=3) == pytest.approx(380.45, rel=1e-4)  # type: ignore[attr-defined]
