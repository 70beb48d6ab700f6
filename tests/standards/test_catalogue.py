"""The catalogue, walked: every formula and criterion is proved, sourced and worked by hand."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping
from decimal import Decimal
from functools import cache
from typing import Any

import mpmath
import pytest
import sympy
from hypothesis import HealthCheck, assume, given, settings
from hypothesis import strategies as st
from tests.formula.by_sympy import value_at

from lineproof.formula import Criterion, Formula
from lineproof.formula.proof import prove, prove_criterion
from lineproof.formula.tree import Negative, numbers_of, walk
from lineproof.standards import catalogue
from lineproof.standards.references import BASES

from .examples import EXAMPLES
from .examples_beam import EXAMPLES_BEAM
from .worked import WORKED, Worked
from .worked_anchorage import WORKED_ANCHORAGE
from .worked_flexure import WORKED_FLEXURE
from .worked_service import WORKED_SERVICE
from .worked_shear import WORKED_SHEAR

FORMULAS = dict(catalogue.formulas())
CRITERIA = dict(catalogue.criteria())
ALL_WORKED = (*WORKED, *WORKED_FLEXURE, *WORKED_SHEAR, *WORKED_SERVICE, *WORKED_ANCHORAGE)
ALL_EXAMPLES = EXAMPLES | EXAMPLES_BEAM
ZEROS = {("interface.SURFACES", "rolled steel", "c_v")}
"""The cells of tables that are zero by the standard."""
LONGEST = 400

# Printed units in N, mm and MPa, written here apart from the package's own list.
IN_N_MM = {
    "": 1.0, "mm": 1.0, "m": 1e3, "mm2": 1.0, "mm4": 1.0, "MPa": 1.0, "N/mm": 1.0, "kPa": 1e-3,
    "kN": 1e3, "kN/m": 1.0, "kN/m3": 1e-6, "kN.m": 1e6, "kN.m/m": 1e3, "kg/m3": 1.0, "deg": 1.0,
    "mm2/mm": 1.0, "m2": 1e6,
}  # fmt: skip


def units_of(names: tuple[str, ...]) -> dict[str, str]:
    """Return the unit that the notation gives each name."""
    return {name: catalogue.NOTATION[name].unit for name in names}


def internal(given: Mapping[str, float], names: tuple[str, ...]) -> list[float]:
    """Return printed values in N, mm, MPa, in the order of the names."""
    return [given[name] * IN_N_MM[catalogue.NOTATION[name].unit] for name in names]


def calculate(text: str) -> float:
    """Evaluate a plain calculation of the worked numbers."""
    scope = {"sqrt": math.sqrt, "min": min, "max": max, "cot": cot, "__builtins__": {}}
    return float(eval(text, scope))  # noqa: S307 - text of this test, not of a user


def cot(angle: float) -> float:
    """Return the cotangent of an angle in degrees."""
    return 1 / math.tan(math.radians(angle))


def last_digit(number: str) -> float:
    """Return one unit of the last written digit: 0.01 for 3.55, 1e6 for 5.000e9."""
    exponent = Decimal(number).as_tuple().exponent
    assert isinstance(exponent, int)
    return 10.0**exponent


@pytest.mark.parametrize("place", FORMULAS)
def test_formula_is_complete(place: str) -> None:
    """Units proved, clause and basis given, declared constants used, names in the notation."""
    formula = FORMULAS[place]
    assert set(formula.names) | {formula.symbol} <= set(catalogue.NOTATION)
    prove(formula, units_of(formula.names))
    assert formula.unit == catalogue.NOTATION[formula.symbol].unit
    _is_described(formula, numbers_of(formula.tree))


@pytest.mark.parametrize("place", CRITERIA)
def test_criterion_is_complete(place: str) -> None:
    """As for a formula; and its key can name a line, its sentences end."""
    criterion = CRITERIA[place]
    assert set(criterion.names) <= set(catalogue.NOTATION)
    prove_criterion(criterion, units_of(criterion.names))
    _is_described(criterion, (*numbers_of(criterion.left), *numbers_of(criterion.right)))
    assert criterion.key.replace("-", "").replace("_", "").isalnum()
    for sentence in filter(None, (criterion.yes, criterion.no)):
        assert sentence.endswith(".")
    if not place.startswith("strain_closing."):  # a closing that fails is no result to print
        assert bool(criterion.yes) == bool(criterion.no)


def _is_described(source: Formula | Criterion, constants: tuple[str, ...]) -> None:
    assert source.clause.strip()
    assert source.title.strip()
    assert source.basis in BASES
    assert set(source.numbers) <= set(constants)
    assert len(source.text) <= LONGEST


def test_every_module_lists_all_it_declares() -> None:
    """A formula or criterion left out of its module's list would escape this walk."""
    for module in catalogue._MODULES:
        values = [v for n, v in vars(module).items() if not n.startswith("_")]
        listed = {id(v) for n in ("FORMULAS", "CRITERIA", "TABLES") for v in getattr(module, n, ())}
        for value in values:
            if type(value).__name__ in ("Formula", "Criterion", "LookupTable"):
                assert id(value) in listed, (module.__name__, getattr(value, "text", value))


@pytest.mark.parametrize("place", dict(catalogue.tables()))
def test_table_is_complete(place: str) -> None:
    """Every row has every column as a positive number; clause, source and basis are given."""
    table = dict(catalogue.tables())[place]
    assert all(table.clause_of(column) for column in table.columns)
    assert table.source
    assert table.basis in BASES
    for key, row in table.rows.items():
        assert set(row) <= set(table.columns)
        for column, number in row.items():
            assert (float(number) == 0) == ((place, key, column) in ZEROS)
            assert float(number) >= 0


def test_clauses_name_their_code() -> None:
    """Loads are clauses of the building code, with its name; statics and geometry are none."""
    entries = [(p, f.clause) for p, f in FORMULAS.items()]
    entries += [(p, c.clause) for p, c in CRITERIA.items()]
    for place, clause in entries:
        if place.startswith(("loads.", "combinations.", "reduction.")):
            # the coefficients of the end moments are the concrete standard's
            ours = clause in ("statics", "geometry") or (place, clause) in (
                ("loads.MOMENT_END_GIRDER", "9.3.3"), ("loads.MOMENT_END_COLUMN", "9.3.3"),
            )  # fmt: skip
            assert clause.startswith("NBC ") or ours, place
    assert FORMULAS["flange.CRACKING_BOTTOM"].clause == "8.6.4"
    assert FORMULAS["flange.INERTIA_TEE"].clause == "geometry"
    assert FORMULAS["compression_steel.STRESS"].clause == "8.5.3.2"
    assert CRITERIA["compression_steel.CLOSES"].clause == "10.1.1"


def test_every_formula_has_a_worked_number() -> None:
    """And no worked number is left of a formula that is gone."""
    assert {row.place for row in ALL_WORKED} == set(FORMULAS)


@pytest.mark.parametrize("row", ALL_WORKED, ids=lambda row: row.place)
def test_worked_number(row: Worked) -> None:
    """The formula gives the number worked out by hand, to its last written digit."""
    formula = FORMULAS[row.place]
    assert row.source
    assert set(row.given) == set(formula.names)
    *steps, result = row.chain.split(" = ")
    assert steps
    for step in steps:
        assert calculate(step) == pytest.approx(
            float(result), abs=0.6 * last_digit(result), rel=3e-5
        )
    found = formula.function(*internal(row.given, formula.names)) / IN_N_MM[formula.unit]
    assert found == pytest.approx(float(result), abs=0.6 * last_digit(result))


def test_every_criterion_has_examples() -> None:
    """And no example is left of a criterion that is gone."""
    assert set(ALL_EXAMPLES) == set(CRITERIA)


@pytest.mark.parametrize("place", CRITERIA)
def test_criterion_holds_and_fails(place: str) -> None:
    """One example holds, one does not."""
    criterion = CRITERIA[place]
    truths = []
    for example in ALL_EXAMPLES[place]:
        values = internal(example, criterion.names)
        left, right = (side(*values) for side in criterion.functions)
        truths.append(criterion.holds(left, right))
    assert truths == [True, False]


def test_a_limit_met_but_for_round_off_holds() -> None:
    """0.1 + 0.2 is 5.6e-17 above 0.3 as a float: a share of 1.9e-16 is met, one of 1e-9 is not."""
    criterion = CRITERIA["flexure.STRENGTH"]
    assert 0.1 + 0.2 > 0.3
    assert criterion.holds(0.1 + 0.2, 0.3)
    assert criterion.holds(327.4e6 * (1 + 1e-13), 327.4e6)
    assert not criterion.holds(327.4e6 * (1 + 1e-9), 327.4e6)


@pytest.mark.parametrize("place", FORMULAS)
@settings(
    max_examples=8, deadline=None, derandomize=True, database=None,
    suppress_health_check=list(HealthCheck),
)  # fmt: skip
@given(data=st.data())
def test_compiled_equals_sympy(place: str, data: st.DataObject) -> None:
    """The compiled function and sympy, read from the text apart, agree to 1e-12.

    Arguments lie within 0.6 to 1.6 times a worked example of the formula. The bound is on the sum
    of all terms taken positive: what a difference cancels, no float can keep.
    """
    formula = FORMULAS[place]
    near = next(row.given for row in ALL_WORKED if row.place == place)
    at = internal(near, formula.names)
    values = [data.draw(st.floats(0.6 * v, 1.6 * v)) for v in at]
    try:
        found = formula.function(*values)
    except ValueError:
        with pytest.raises(ValueError, match="no real value"):
            value_at(formula.tree, dict(zip(formula.names, values, strict=True)))
        return
    mpmath.mp.dps = 50
    exact = float(_by_sympy(formula.text)(*[mpmath.mpf(v) for v in values]))
    scale = _sum_of_terms(formula, values)
    assume(abs(exact) > 1e-3 * scale)
    assert abs(found - exact) <= 1e-12 * scale
    assert value_at(formula.tree, dict(zip(formula.names, values, strict=True))) == exact


@cache
def _by_sympy(text: str) -> Callable[..., Any]:
    """Return the right side of a formula as an mpmath function, parsed by sympy itself."""
    right = text.partition("=")[2]
    names = next(f.names for f in FORMULAS.values() if f.text == text)
    scope: dict[str, object] = {name: sympy.Symbol(name) for name in names}
    scope |= {"max": sympy.Max, "min": sympy.Min}
    for name in ("sin", "cos", "cot"):
        scope[name] = _in_degrees(getattr(sympy, name))
    made: Callable[..., Any] = sympy.lambdify(
        [scope[n] for n in names], sympy.sympify(right, locals=scope, rational=True), "mpmath"
    )
    return made


def _in_degrees(function: Callable[..., Any]) -> Callable[..., Any]:
    return lambda angle: function(angle * sympy.pi / 180)


def _sum_of_terms(formula: Formula, values: list[float]) -> float:
    scope = dict(zip(formula.names, values, strict=True))
    text = formula.text.partition("=")[2].replace(" - ", " + ")
    assert not any(isinstance(node, Negative) for node in walk(formula.tree))
    # Sines of these angles are at most 1, so that the bound stays one.
    functions = {
        "sqrt": math.sqrt, "min": max, "max": max, "cot": cot, "sin": abs, "cos": abs, "abs": abs,
        "__builtins__": {},
    }  # fmt: skip
    return float(eval(text, functions, scope))  # noqa: S307 - text of the catalogue
