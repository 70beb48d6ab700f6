"""The unit proof, declaring formulas, and the notation."""

from __future__ import annotations

import pytest

from lineproof.errors import UserError
from lineproof.formula import Notation, Symbol, criterion, formula, symbol_from_id
from lineproof.formula.proof import UnitProofError, number_unit, prove, prove_criterion
from lineproof.quantity import registry

UNITS = {
    "M": "kN.m", "w": "kN/m", "L": "m", "h": "mm", "b": "in", "f_c": "MPa", "A": "mm2", "n": "",
    "theta": "deg", "rho": "kg/m3", "F": "kN", "gamma": "kN/m3", "V": "mm3",
}  # fmt: skip


@pytest.mark.parametrize(
    ("text", "unit", "numbers"),
    [
        ("M = w*L**2/8", "kN.m", {}),
        ("A = b*h", "mm2", {}),
        ("A = b*h", "in2", {}),
        ("x = h + b - L/4", "mm", {}),
        ("x = max(h, b, 0)", "mm", {}),
        ("x = sqrt(b*h)", "mm", {}),
        ("x = cbrt(V)", "mm", {}),
        ("x = V**(1/3)", "mm", {}),
        ("x = h**-1", "1/mm", {}),
        ("x = abs(-h) - 0", "mm", {}),
        ("x = F*cot(theta)*sin(theta)", "kN", {}),
        ("w = gamma*b*h", "kN/m", {}),
        ("E_c = 4500*sqrt(f_c)", "MPa", {"4500": "MPa^0.5"}),
        ("alpha = 0.85 - 0.0015*f_c", "", {"0.0015": "1/MPa"}),
        ("x = (rho/2300)**1.5*h", "mm", {"2300": "kg/m3"}),
        ("x = h*sin(30)", "mm", {"30": "deg"}),
        ("q = F/A", "kPa", {}),
    ],
)
def test_proved(text: str, unit: str, numbers: dict[str, str]) -> None:
    prove(formula(text, unit=unit, numbers=numbers), UNITS)


@pytest.mark.parametrize(
    ("text", "unit", "numbers", "why"),
    [
        ("M = w*L", "kN.m", {}, "gives N, which is not the result's kN.m"),
        ("x = h + A", "mm", {}, "so the sum has no meaning"),
        ("x = h + 5", "mm", {}, "so the sum has no meaning"),
        ("x = max(h, F)", "mm", {}, "like the other values"),
        ("x = h**n", "mm", {}, "an exponent must be a plain number"),
        ("x = h**(1/0)", "mm", {}, "an exponent must be a plain number"),
        ("x = F*sin(h)", "kN", {}, "which is not an angle"),
        ("x = F*sin(30)", "kN", {}, "which is not an angle"),
        ("E_c = 4500*sqrt(f_c)", "MPa", {}, "which is not the result's MPa"),
        ("E_c = 4500*sqrt(f_c)", "MPa", {"4500": "kPa^0.5"}, "not of the N, mm, MPa system"),
        ("x = 2.4*h", "mm", {"2.4": "kg/mm"}, "is not the unit of a constant"),
        ("x = 2.4*h", "mm", {"2.4": "9**9**9"}, "is not the unit of a constant"),
        ("x = 2.4*h", "mm", {"2.4": "__import__('os')"}, "is not the unit of a constant"),
        ("x = n", "deg", {}, "gives a bare number, which is not the result's deg"),
    ],
)
def test_refused(text: str, unit: str, numbers: dict[str, str], why: str) -> None:
    with pytest.raises(UnitProofError) as caught:
        prove(formula(text, unit=unit, numbers=numbers), UNITS)
    assert why in str(caught.value)


def test_criteria_are_proved_on_both_sides() -> None:
    prove_criterion(criterion("M <= F*h", unit="kN.m"), UNITS)
    prove_criterion(criterion("h > 0", unit="mm"), UNITS)
    prove_criterion(criterion("h/b <= 0.5", unit=""), UNITS)
    for text, unit in (("M <= F", "kN.m"), ("M <= F*h", "kN"), ("h > 5", "mm")):
        with pytest.raises(UnitProofError):
            prove_criterion(criterion(text, unit=unit), UNITS)


def test_units_of_constants() -> None:
    ureg = registry()
    assert number_unit("MPa^0.5") == ureg.Unit("MPa**0.5")
    assert number_unit("1/MPa") == ureg.Unit("1/MPa")
    assert number_unit("kg/m3") == ureg.Unit("kg/m**3")
    assert number_unit("1/mm") == ureg.Unit("1/mm")
    assert number_unit("") == ureg.Unit("dimensionless")


NOTATION = Notation([
    Symbol("f_c", "f", "c", "′", "specified strength", "MPa"),
    Symbol("a", "a", "", "", "depth of the stress block", "mm"),
])  # fmt: skip


def test_declaring_takes_units_from_the_notation() -> None:
    assert formula("a = f_c*a", notation=NOTATION).unit == "mm"
    assert criterion("a/2 <= a", notation=NOTATION).unit == "mm"
    assert criterion("a/f_c <= 2", notation=NOTATION).unit == ""
    assert criterion("0.5*a <= a - 3", unit="mm").key == "0_5_a_at_most_a_3"
    with pytest.raises(UserError, match="'furlong' is not a unit"):
        formula("a = b", unit="furlong")
    with pytest.raises(UserError, match="x: say in which unit"):
        formula("x = a", notation=NOTATION)


def test_a_criterion_compares() -> None:
    test = criterion("a <= b", unit="mm")
    assert test.holds(1.0, 1.0)
    assert not criterion("a < b", unit="mm").holds(1.0, 1.0)
    assert [side(1.0, 2.0) for side in test.functions] == [1.0, 2.0]


@pytest.mark.parametrize(
    ("symbol_id", "base", "sub"),
    [("f_c", "f", "c"), ("gamma_c", "γ", "c"), ("w_cb", "w", "cb"), ("lambda_", "λ", ""),
     ("M_r_max", "M", "r,max"), ("eps_phi", "ε", "φ"), ("h", "h", ""), ("l_av1", "ℓ", "av1")],
)  # fmt: skip
def test_typeset_parts_of_an_id(symbol_id: str, base: str, sub: str) -> None:
    made = symbol_from_id(symbol_id, "what it means", "mm")
    assert (made.base, made.sub, made.sup) == (base, sub, "")
    assert (made.meaning, made.unit) == ("what it means", "mm")


@pytest.mark.parametrize(
    "symbol_id", ["", "_a", "1a", "lambda", "f'c", "a b", "φ", "a" * 41, "None", "a-b", "a\n"]
)
def test_no_symbol(symbol_id: str) -> None:
    with pytest.raises(UserError, match="use letters, digits and underscores"):
        symbol_from_id(symbol_id)


def test_one_symbol_one_meaning() -> None:
    assert len(NOTATION | NOTATION) == 2
    assert hash(NOTATION) == hash(Notation(reversed([*NOTATION.values()])))
    other = Notation([Symbol("a", "a", "", "", "shear span", "mm")])
    with pytest.raises(ValueError, match="'a' stands twice"):
        _ = NOTATION | other
