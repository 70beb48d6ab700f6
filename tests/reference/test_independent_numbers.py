"""That every numbered independent check stands in a test, and what is said beside the numbers.

The checks themselves: test_independent_checks.py (1, 2, 4 to 7, 14) and
test_independent_beam_checks.py (2 in service, 3, 8 to 13, 15).
"""

from __future__ import annotations

import ast
import re
from pathlib import Path

import pytest

from lineproof.standards.a23_3 import (
    crack_control,
    deflection,
    development,
    hooks,
    shear,
    shear_bars,
    torsion,
)

from .calculator import value

NUMBERS = (
    "1", "2", "3", "4", "5a", "5b", "5c", "6", "7", "8", "8b", "9", "9b", "10", "11", "11b",
    "12", "12b", "12c", "13", "14", "15",
)  # fmt: skip
FILES = ("test_independent_checks.py", "test_independent_beam_checks.py")


def numbers_tested() -> set[str]:
    """Return the numbers in the names of the tests: ``test_no_5a_rectangular`` gives 5a."""
    names = [
        node.name
        for file in FILES
        for node in ast.parse(Path(__file__).with_name(file).read_text(encoding="utf-8")).body
        if isinstance(node, ast.FunctionDef)
    ]
    return {found[1] for name in names if (found := re.match(r"test_no_(\d+[abc]?)_", name))}


def test_every_number_is_tested() -> None:
    assert numbers_tested() == set(NUMBERS)


def test_no_7_the_limit() -> None:
    """21 456 N/mm is less than 25 000 of exterior exposure."""
    assert 21456 <= crack_control.LIMITS.number("exterior", "z_max") == 25000


def test_no_8_stirrups_are_not_below_the_minimum() -> None:
    """10M at 225: 0.06 sqrt(35) x 350 x 225/400 = 69.9 mm2 against 200, spacing 225 <= 337."""
    x: dict[str, float] = {"f_c": 35, "b_w": 350, "s": 225, "f_y": 400, "d_v": 481.5}
    assert value(shear.A_V_MIN, x) == pytest.approx(69.9, abs=0.05)
    assert value(shear.S_MAX, x) >= 225


def test_no_9b_the_parts_of_the_force() -> None:
    """160e6/481.5 = 332.3; (260 - 103.9) cot 35 = 222.9; together 555.2 kN."""
    x: dict[str, float] = {
        "M_f": 160e6, "d_v": 481.5, "V_f": 260e3, "V_s": 207.8e3, "theta": 35,
    }  # fmt: skip
    whole, end = value(shear_bars.TENSION_SIDE, x), value(shear_bars.END_SUPPORT, x)
    assert (whole - end) / 1e3 == pytest.approx(332.3, abs=0.05)


def test_no_10_the_spacing_is_broken() -> None:
    """10M at 225 breaks the halved limit of 168 mm: 0.35 x 481.5 = 168.5."""
    most = value(shear.S_MAX_HALVED, {"d_v": 481.5})
    assert int(most) == 168
    assert most < 225
    assert value(torsion.A_O, {"A_oh": 131601}) == pytest.approx(0.85 * 131601, rel=1e-12)


def test_no_11_the_whole_modulus_adds_15_per_cent() -> None:
    """3030/2630 = 1.152: (3030 - 2572)/(2630 - 2572) = 8, the cube of 2 on M_cr."""
    x: dict[str, float] = {"I_cr": 2572e6, "I_g": 6300e6, "M_a": 150e6, "M_crd": 37.27e6}
    half = value(deflection.EFFECTIVE, x)
    whole = value(deflection.EFFECTIVE, x | {"M_crd": 2 * 37.27e6})
    assert whole / half == pytest.approx(1.152, abs=0.0005)
    assert (whole - 2572e6) / (half - 2572e6) == pytest.approx(8, rel=1e-9)


def test_no_12_the_sum_stays_below_its_cap() -> None:
    """49.4 + 8.47 = 57.9 <= 2.5 x 25.2 = 63 mm; 1.15 x 400 x 500/(57.9 sqrt(35)) = 672 mm."""
    x: dict[str, float] = {
        "k_1": 1, "k_2": 1, "k_3": 1, "k_4": 1, "f_y": 400, "A_b": 500, "d_b": 25.2, "f_c": 35,
        "d_cs": 49.4, "K_tr": 8.47,
    }  # fmt: skip
    assert x["d_cs"] + x["K_tr"] == pytest.approx(57.9, abs=0.05)
    assert value(development.GENERAL, x) == pytest.approx(672, abs=1)
    capped = value(development.GENERAL, x | {"d_cs": 100.0})
    assert capped == pytest.approx(1.15 * 400 * 500 / (63 * 35**0.5), rel=1e-12)


def test_no_12b_the_cover_of_the_beam_alone_is_too_small() -> None:
    """40 + 11.3 = 51.3 mm beside the hook, less than 60: no factor of 0.7."""
    sides = [side(51.3) for side in hooks.SIDE_COVERED.functions]
    assert not hooks.SIDE_COVERED.holds(*sides)
    assert [side(50.0) for side in hooks.TAIL_COVERED.functions] == [50, 50]
