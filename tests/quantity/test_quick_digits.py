"""Rounding by the float's own formatting, against decimal arithmetic."""

from __future__ import annotations

from decimal import ROUND_HALF_UP, Context, Decimal

import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st

from lineproof.quantity.quick_digits import quick_text, quick_value, written
from lineproof.quantity.units import power_of_ten

NUMBERS = st.one_of(
    st.floats(allow_nan=False, allow_infinity=False),
    st.floats(-1e9, 1e9),
    st.integers(-(10**8), 10**8).map(lambda n: n / 1000),
    st.integers(-(10**6), 10**6).map(lambda n: n / 64),
)


def by_decimals(value: float, digits: int) -> Decimal:
    """Round half up, as decimals do it."""
    return Context(prec=digits, rounding=ROUND_HALF_UP).plus(Decimal(value))


@settings(deadline=None, max_examples=400)
@given(NUMBERS, st.integers(1, 17))
@example(0.125, 2)
@example(-0.0, 3)
@example(9.995, 3)
@example(999.5, 3)
def test_a_quick_value_is_the_one_of_decimals(value: float, digits: int) -> None:
    quick = quick_value(value, digits)
    assert quick is None or repr(quick) == repr(float(by_decimals(value, digits)))


@settings(deadline=None, max_examples=400)
@given(NUMBERS, st.integers(1, 17), st.sampled_from([0, 3, -3, 6, -6, 12]))
@example(1200.0, 2, 0)
def test_a_quick_text_reads_back_as_the_decimal(value: float, digits: int, power: int) -> None:
    text = quick_text(value, digits, power)
    wanted = by_decimals(value, digits).scaleb(power)
    assert text is None or Decimal(text) == wanted
    if text is not None and wanted and "." in text:
        # Every digit is shown, and none besides.
        shown = text.partition("e")[0].replace(".", "").lstrip("-0")
        assert len(shown) == digits


@pytest.mark.parametrize("value", [2.5, 0.125, 1.25, float("inf"), float("nan")])
def test_decimals_decide_half_way(value: float) -> None:
    assert quick_text(value, len(f"{value:g}".replace(".", "").lstrip("0")) - 1) is None


@pytest.mark.parametrize("digits", [0, -2, 60])
def test_decimals_decide_about_decimals(digits: int) -> None:
    assert quick_value(1.234, digits) is None


def test_a_short_number_that_is_scaled_is_left_to_decimals() -> None:
    # 0.5 MPa is 5e2 kPa as a decimal, with one digit of its own.
    assert quick_text(0.5, 3, 3) is None
    assert quick_text(0.5, 3) == "0.500"


@pytest.mark.parametrize(
    ("figures", "exponent", "text"),
    [
        ("123", 2, "123"), ("123", 4, "12300"), ("12", 4, "12e3"), ("140", -1, "0.140"),
        ("551", 8, "551e6"), ("500", 9, "5.00e9"), ("2", -16, "2e-16"), ("3", 2, "3e2"),
        ("123456", 5, "123456"), ("123", -7, "123e-9"), ("1234", -4, "0.0001234"),
    ],
)  # fmt: skip
def test_figures_are_written_as_printed_numbers(figures: str, exponent: int, text: str) -> None:
    assert written(figures, exponent) == text


@pytest.mark.parametrize(
    ("unit", "into", "power"),
    [("m", "mm", 3), ("kPa", "MPa", -3), ("mm", "mm", 0), ("kip", "N", None), ("kN.m", "N.mm", 6)],
)
def test_units_apart_by_a_power_of_ten(unit: str, into: str, power: int | None) -> None:
    assert power_of_ten(unit, into) == power
