"""Digits for print, against plain decimal arithmetic."""

from __future__ import annotations

import math
from decimal import Decimal, localcontext

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from lineproof.quantity.digits import (
    Argument,
    choose_digits,
    digits_in,
    number_text,
    rounded_text,
    start_digits,
)


@pytest.mark.parametrize(
    ("value", "digits", "text"),
    [
        (551.4, 3, "551"),
        (12345.0, 3, "12300"),
        (0.1404, 3, "0.140"),
        (0.00085, 3, "0.000850"),
        (5e9, 3, "5.00e9"),
        (5.08e8, 3, "508e6"),  # powers of ten go by threes
        (1.2345e-7, 3, "123e-9"),
        (2.3e-16, 1, "2e-16"),  # 200e-18 would show two digits too many
        (1.23e11, 2, "1.2e11"),
        (12345.0, 2, "12e3"),  # 12000 would look like three digits or five
        (345.0, 1, "3e2"),
        (345.0, 2, "3.5e2"),
        (300.0, 3, "300"),
        (999.6, 3, "1000"),
        (-26.14, 3, "-26.1"),
        (2.5, 1, "3"),  # half up, as on a pocket calculator
        (-2.5, 1, "-3"),
        (90.25, 3, "90.3"),
        (0.0, 3, "0"),
        (-0.0, 3, "0"),
        (0.0004, -2, "0.00"),
        (-0.0004, -2, "0.00"),
        (1e-12, 0, "0"),
        (0.7, 0, "1"),
    ],
)
def test_rounded_texts(value: float, digits: int, text: str) -> None:
    assert rounded_text(value, digits) == text


@settings(deadline=None)
@given(st.floats(min_value=1e-12, max_value=1e15), st.integers(1, 15), st.sampled_from([1, -1]))
def test_a_rounded_text_is_the_decimal_rounding(value: float, digits: int, sign: int) -> None:
    value *= sign
    with localcontext() as context:  # independent: a decimal context of so many digits
        context.prec = digits
        context.rounding = "ROUND_HALF_UP"
        expected = +Decimal(value)
    text = rounded_text(value, digits)
    assert Decimal(text) == expected
    assert float(text) == float(expected)
    assert text.isascii()
    assert not text.startswith("-0") or text[2] == "."


@pytest.mark.parametrize(
    ("text", "digits"), [("7600", 4), ("0.140", 3), ("5.00e9", 3), ("-12.5", 3), ("0", 1)]
)
def test_digits_in_a_text(text: str, digits: int) -> None:
    assert digits_in(text) == digits


def test_sizes_start_at_whole_millimetres() -> None:
    assert start_digits(1900.0, "mm") == 4
    assert start_digits(31415.9, "mm") == 5
    assert start_digits(26.1, "mm") == 3
    assert start_digits(1900.0, "kN") == 3
    assert start_digits(1e9, "mm") == 6
    assert number_text(Decimal("0e5")) == "0"


def test_a_cancelling_argument_gains_digits() -> None:
    # By hand: 550.4 - 541.3 = 9.1; with 550 and 541 the difference would be 9.
    chosen = choose_digits(
        lambda a, b: a - b, [Argument(550.4, 3), Argument(541.3, 3)], 550.4 - 541.3, "mm"
    )
    assert min(chosen.args) > 3
    assert chosen.result == 3


def test_a_result_of_rounding_only_prints_as_zero() -> None:
    # T = C up to the last bits: the difference means nothing, and prints as nothing.
    t, c = 1580123.4, 1580123.4 * (1 - 3e-13)
    chosen = choose_digits(lambda a, b: a - b, [Argument(t, 3), Argument(c, 3)], t - c, "N")
    assert max(chosen.args) <= 6
    assert set(rounded_text(t - c, chosen.result)) <= {"0", "."}


def test_an_argument_that_cannot_be_computed_when_rounded_gains_digits() -> None:
    a, b = 100.04, 100.01
    chosen = choose_digits(
        lambda x, y: math.sqrt(x - y), [Argument(a, 3), Argument(b, 3)], math.sqrt(a - b), ""
    )
    assert min(chosen.args) >= 5


def test_half_way_a_result_gains_a_digit_before_it_loses_one() -> None:
    """218.62449 - 40.55241 x 0.225 = 209.5002 rounds to 210, but six digits give 209.4997.

    No six digits give 210, and 2.1e2 would say less than is known: 209.5 is what both give.
    """
    V, w, x = Argument(218.62449, 6), Argument(40.55241, 6), Argument(0.225, 3, 0.225)
    value = 218.62449 - 40.55241 * 0.225
    assert round(218.624 - 40.5524 * 0.225, 4) == 209.4997
    chosen = choose_digits(lambda V, w, x: V - w * x, (V, w, x), value, "kN")
    assert chosen.result == 4
    assert rounded_text(value, chosen.result) == "209.5"
