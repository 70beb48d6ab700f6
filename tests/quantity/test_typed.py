"""Reading typed quantities: values, and errors word by word."""

from __future__ import annotations

import math
import time
from decimal import Decimal
from fractions import Fraction
from typing import Any

import pint
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from lineproof.errors import UserError
from lineproof.quantity import UNITS, echo, factor, read_quantity, registry


@pytest.mark.parametrize(
    ("typed", "unit", "value", "number"),
    [
        ("7.6 m", "mm", 7600.0, "7.6"),
        ("7.6m", "mm", 7600.0, "7.6"),
        ("24 in", "mm", 609.6, "24"),  # 24 x 25.4
        ("5000 psi", "MPa", 34.47378646584181, "5000"),  # 5000 x 4.4482216152605/645.16
        ("0.30 m", "mm", 300.0, "0.30"),  # zeros typed are kept
        ("+4.8 kPa", "MPa", 0.0048, "4.8"),
        ("-.5 kN", "N", -500.0, "-0.5"),
        ("−0.10 m", "mm", -100.0, "-0.10"),  # a true minus, as printed
        ("5. mm", "mm", 5.0, "5"),
        ("2E+05 MPa", "MPa", 200000.0, "2e5"),
        ("1e-3 m", "mm", 1.0, "1e-3"),
        ("007 mm", "mm", 7.0, "7"),
        ("-0.0 mm", "mm", 0.0, "0.0"),
        ("0.65", "", 0.65, "0.65"),
        (0.65, "", 0.65, "0.65"),
        (0.1 + 0.2, "", 0.1 + 0.2, "0.30000000000000004"),
        (3, "", 3.0, "3"),
        (Decimal("1.50"), "", 1.5, "1.50"),
        ("45°", "deg", 45.0, "45"),
        ("7.6\u00a0 m", "mm", 7600.0, "7.6"),
        # Feet and inches, as on drawings: 1 ft is 304.8 mm and 1 in 25.4 mm exactly.
        ("25'-0\"", "mm", 7620.0, "25"),  # 25 x 304.8
        ("25'", "mm", 7620.0, "25"),
        ("25'-6 1/2\"", "mm", 7785.1, "306.5"),  # 25 x 12 + 6.5 = 306.5; x 25.4
        ("25 ft 6 1/2 in", "mm", 7785.1, "306.5"),
        ("25’ – 6½”".replace("–", "-"), "mm", 7785.1, "306.5"),
        ("0'-6\"", "mm", 152.4, "6"),
        ("-2'-6\"", "mm", -762.0, "-30"),  # the sign is that of the whole length
        ("3/4 in", "mm", 19.05, "0.75"),
        ('3/4"', "mm", 19.05, "0.75"),
        ("6-1/2 in", "mm", 165.1, "6.5"),
        ("1/64 in", "mm", 0.396875, "0.015625"),
        ("1'-10.5''", "mm", 571.5, "22.5"),  # 22.5 x 25.4
        ("1.50 in", "mm", 38.1, "1.50"),  # zeros typed are kept
        ("1.5 kip/ft", "N/mm", 21.890854405809547, "1.5"),  # 1.5 x 4448.2216152605/304.8
        ("25 lb/ft2", "MPa", 0.001197006474508396, "25"),  # 25 x 4.4482216152605/304.8^2
    ],
)
def test_typed_values(typed: Any, unit: str, value: float, number: str) -> None:
    read = read_quantity("x", typed, unit)
    assert read.value == pytest.approx(value, rel=1e-15, abs=1e-300)
    assert read.number == number


@pytest.mark.parametrize(
    ("typed", "unit", "sentence"),
    [
        ("32", "MPa", "f_c: '32' has no unit; write '32 MPa'"),
        (32, "MPa", "f_c: '32' has no unit; write '32 MPa'"),
        (32.5, "MPa", "f_c: '32.5' has no unit; write '32.5 MPa'"),
        ("32 mm", "MPa", ("f_c: '32 mm' is a length, but a stress or pressure is needed; "
                          "write it in MPa, Pa, kPa, GPa, psi, ksi, psf, ksf")),
        ("2 kN", "kPa", ("f_c: '2 kN' is a force, but a stress or pressure is needed; "
                         "write it in kPa, MPa, Pa, GPa, psi, ksi, psf, ksf")),
        ("2 ft 2 in", "MPa", ("f_c: '2 ft 2 in' is a length, but a stress or pressure is needed; "
                              "write it in MPa, Pa, kPa, GPa, psi, ksi, psf, ksf")),
        ("2 m 2 mm", "m", ("f_c: '2 m 2 mm': 'm 2 mm' is not a unit of the list; "
                           "write one number with one unit, such as '26 in', and a comma "
                           "between two texts of a list")),
        ("2'-13\"", "mm", ("f_c: '2\\'-13\"' is not understood; write '25 ft 6 1/2 in': "
                          "inches below 12, in halves down to sixty-fourths")),
        ("1/3 in", "mm", ("f_c: '1/3 in' is not understood; write '25 ft 6 1/2 in': "
                          "inches below 12, in halves down to sixty-fourths")),
        ("61/2 in", "mm", ("f_c: '61/2 in' is not understood; write '25 ft 6 1/2 in': "
                           "inches below 12, in halves down to sixty-fourths")),
        # 1.200 kN typed for 1200 kN would be a thousandth of the load.
        ("1,200 kN", "kN", ("f_c: '1,200 kN' is not a number with a unit; write '1200 kN' where "
                            "the comma parts thousands, else '1.200 kN'")),
        ("1,234,567 N", "N", "f_c: '1,234,567 N' is not a number with a unit; write '1234567 N'"),
        ("7 600 mm", "mm", "f_c: '7 600 mm' has spaces between its digits; write '7600 mm'"),
        ("12 k", "kN", "f_c: '12 k': 'k' is not a unit of the list; write 'kip'"),
        ("3 k-ft", "kN.m", "f_c: '3 k-ft': 'k-ft' is not a unit of the list; write 'kip.ft'"),
        ("1.8 kn/m2", "kPa", "f_c: '1.8 kn/m2': 'kn/m2' is not a unit of the list; write 'kPa'"),
        ("150 pcf", "kg/m3", ("f_c: '150 pcf' is a unit weight, but a density is needed; "
                              "write '150 lb/ft3'")),
        ("900 lb/ft", "kN/m", ("f_c: '900 lb/ft' is a mass per length, but a load per length is "
                               "needed; write '900 plf'")),
        ("32 Mpa", "MPa", "f_c: '32 Mpa': 'Mpa' is not a unit of the list; write 'MPa'"),
        ("15 yards", "mm", ("f_c: '15 yards': 'yards' is not a unit of the list; "
                            "write it in mm, cm, m, in, ft")),
        ("3 kn", "m", "f_c: '3 kn': 'kn' is not a unit of the list; write it in m, mm, cm, in, ft"),
        ("50 %", "", "f_c: '50 %' is in percent; write '0.5'"),
        ("0,65", "", "f_c: '0,65' is not a number with a unit; write a decimal point: '0.65'"),
        ("7,6 m", "mm", "f_c: '7,6 m' is not a number with a unit; write a decimal point: '7.6 m'"),
        ("abc", "MPa", "f_c: 'abc' is not a number with a unit; write for example '25 MPa'"),
        ("", "MPa", "f_c: '' is not a number with a unit; write for example '25 MPa'"),
        ("0.65 mm", "", "f_c: '0.65 mm' has a unit; write the bare number '0.65'"),
        (None, "MPa", "f_c: 'None' is not a quantity; write '25 MPa'"),
        (True, "", "f_c: 'True' is not a quantity; write '25'"),
        ([32], "MPa", "f_c: '[32]' is not a quantity; write '25 MPa'"),
        (math.nan, "MPa", "f_c: 'nan' is not a number with a unit; write for example '25 MPa'"),
    ],
)  # fmt: skip
def test_error_sentences(typed: Any, unit: str, sentence: str) -> None:
    with pytest.raises(UserError) as caught:
        read_quantity("f_c", typed, unit)
    assert str(caught.value) == sentence
    assert caught.value.exit_code == 2


HOSTILE: list[Any] = [
    "nan MPa", "inf MPa", "-inf", "NaN", "Infinity MPa", math.inf, -math.inf, Decimal("NaN"),
    Decimal("sNaN"), Decimal("Infinity"), 10**5000, -(10**5000), 10**400, "1e999 MPa", "1e400",
    "9" * 10_000 + " MPa", "1" + "0" * 100 + " MPa", "1.2.3 MPa", "1 2 MPa", "1_000 MPa",
    "0x20 MPa", "٣٢ MPa", "３２ MPa", "−−32 MPa", "32 MPa MPa", "32 9**9**9", "32 m**9**9**9",
    "32 __import__('os')", "9**9**9", "32 MPa; 5", "32 MPa\x00", "32" + " " * 100_000,
    "3" * 100_000, "1/2" * 10_000 + " in", "5'" + "-" * 50_000 + "6 in", "+-6 in", "1/0 in",
    "(" * 10_000, "1e5e5 MPa", "--5 MPa", "5e MPa", ".", "+", "e5 MPa", b"32 MPa",
    {"a": 1}, object(), 3 + 4j, "\ud800 MPa", "32\nMPa\n" * 2000, {1, 2}, range(3),
]  # fmt: skip


@pytest.mark.parametrize("typed", HOSTILE, ids=range(len(HOSTILE)))
def test_hostile_input_is_refused_quickly(typed: Any) -> None:
    start = time.perf_counter()
    with pytest.raises(UserError) as caught:
        read_quantity("f_c", typed, "MPa")
    assert time.perf_counter() - start < 2
    assert str(caught.value).startswith("f_c: ")
    assert len(str(caught.value)) < 300


def test_a_pint_quantity_of_any_registry_is_taken() -> None:
    theirs: Any = pint.UnitRegistry()
    assert read_quantity("h", theirs.Quantity(2, "foot"), "mm").value == pytest.approx(609.6)
    assert read_quantity("q", theirs.Quantity(100, "psi"), "kPa").text == "689.475729317 kPa"
    assert read_quantity("t", theirs.Quantity(90, "minute"), "h").value == pytest.approx(1.5)
    for unit in UNITS.values():  # and our own, for every unit of the list
        ours = registry().Quantity(2.0, unit.expression)
        again = read_quantity("x", ours, unit.spelling)
        assert again.value == pytest.approx(float(2 * factor(unit.spelling, unit.internal)))


def test_a_pint_quantity_of_another_kind_is_refused() -> None:
    theirs: Any = pint.UnitRegistry()
    for wrong in (theirs.Quantity(2, "second"), theirs.Quantity(math.nan, "mm")):
        with pytest.raises(UserError, match=r"^h: .*write"):
            read_quantity("h", wrong, "mm")
    with pytest.raises(UserError, match="is not a length; write it in mm"):
        read_quantity("h", theirs.Quantity([1, 2], "kN"), "mm")


@settings(deadline=None)
@given(
    st.decimals(min_value=-(10**9), max_value=10**9, places=4),
    st.sampled_from(sorted(u for u in UNITS if u)),
)
def test_reading_is_exact_decimal_arithmetic(number: Decimal, unit: str) -> None:
    read = read_quantity("x", f"{number} {unit}", unit)
    # Independent: rational arithmetic on the typed text, rounded to a float once.
    expected = Fraction(str(number)) * Fraction(factor(unit, UNITS[unit].internal))
    assert read.value == pytest.approx(float(expected), rel=1e-15)
    assert Decimal(read.number) == number


@settings(deadline=None)
@given(st.floats(allow_nan=False, allow_infinity=False, min_value=-1e80, max_value=1e80))
def test_every_ordinary_float_can_be_given_as_a_number(value: float) -> None:
    try:
        read = read_quantity("x", value, "")
    except UserError as error:  # more than 99 or less than -99 as power of ten
        assert abs(value) < 1e-80 or len(repr(value)) > 20, error  # noqa: PT017
    else:
        assert read.value == value


def test_echo_is_short() -> None:
    assert len(echo("x" * 10_000)) == 62
    assert echo(10**5000) == "a number of more than 60 digits"


@given(
    st.integers(0, 999), st.integers(0, 11), st.integers(0, 63), st.sampled_from((2, 4, 8, 16, 64))
)
def test_feet_and_inches_are_exact(feet: int, inches: int, above: int, below: int) -> None:
    above %= below
    typed = f"{feet}'-{inches} {above}/{below}\""
    exact = (feet * 12 + inches + Fraction(above, below)) * Fraction(254, 10)  # 1 in = 25.4 mm
    assert Fraction(read_quantity("span", typed, "mm").exact) == exact
