"""Tables of shear, service and anchorage, digit by digit; editions; where live load is reduced."""

from __future__ import annotations

import pytest

from lineproof.errors import UserError
from lineproof.sheet import LookupTable
from lineproof.standards.a23_3 import (
    analysis,
    deflection,
    development,
    hooks,
    interface,
    shear_factors,
)
from lineproof.standards.a23_3.bars import GRADES
from lineproof.standards.a23_3.cover import EXPOSURES
from lineproof.standards.codes import code_pair
from lineproof.standards.nbc import loads, reduction
from lineproof.standards.nbc.combinations import CASES, SERVICE_CASES, factored, specified


def column(table: LookupTable, name: str) -> list[float]:
    """Return one column, top to bottom."""
    return [table.number(row, name) for row in table.rows]


def test_coefficients() -> None:
    """A23.3 Table 9.1, from memory: 11, 14, 16; 9, 10, 11, 12; 24, 16; shear 1.15 and 1."""
    assert column(analysis.MOMENT_DIVISORS, "k_M") == [11, 14, 16, 9, 10, 11, 12, 24, 16]
    assert column(analysis.SHEAR_FACTORS, "k_V") == [1.15, 1]


def test_shear_values() -> None:
    """A23.3-04, 11.3.6: 0.18 and 35 degrees; special members 0.21 and 42 degrees (from memory)."""
    assert shear_factors.SIMPLIFIED.rows["minimum stirrups or more"] == {
        "beta": "0.18",
        "theta": "35",
    }
    assert shear_factors.SIMPLIFIED.rows["below minimum stirrups"] == {"theta": "35"}
    assert shear_factors.SPECIAL.rows["shallow beam"] == {"beta": "0.21", "theta": "42"}


def test_simplified_factor_follows_from_the_general_method() -> None:
    """Strain 0.85e-3: 0.40/2.275 = 0.1758 (read 0.18), x 1300 = 228.6 (230), 34.95 (35) degrees."""
    assert shear_factors.BETA_STIRRUPS.function(0.85e-3) == pytest.approx(0.1758, abs=5e-5)
    assert shear_factors.BETA_STIRRUPS.function(0.85e-3) * 1300 == pytest.approx(228.6, abs=0.05)
    assert shear_factors.THETA.function(0.85e-3) == pytest.approx(34.95)


def test_interface_tables() -> None:
    """A23.3, 11.5, from memory: cohesion and friction of four surfaces; 0.5 and 0.6."""
    pairs = [(float(r["c_v"]), float(r["mu"])) for r in interface.SURFACES.rows.values()]
    assert pairs == [(0.25, 0.6), (0.5, 1.0), (1.0, 1.4), (0.0, 0.6)]
    assert column(interface.ALTERNATIVE_FACTORS, "k_i") == [0.5, 0.6]


def test_deflection_tables() -> None:
    """A23.3 Tables 9.2 and 9.3, from memory; S 1.0, 1.2, 1.4, 2.0 (published paper)."""
    assert column(deflection.SPAN_DEPTH, "k_h") == [16, 18, 21, 8, 20, 24, 28, 10]
    assert column(deflection.DURATIONS, "S_t") == [1.0, 1.2, 1.4, 2.0]
    assert column(deflection.LIMITS, "k_D") == [180, 360, 480, 240]


def test_development_tables() -> None:
    """A23.3, 12.2.4 and 12.4: k_1 to k_3 from memory, k_4 as in a public table of l_d."""
    assert column(development.LOCATION, "k_1") == [1.3, 1.0]
    assert column(development.COATING, "k_2") == [1.5, 1.2, 1.0]
    assert column(development.DENSITY, "k_3") == [1.0, 1.2, 1.3]
    sizes = {size: development.SIZE.number(size, "k_4") for size in development.SIZE.rows}
    assert sizes == {
        "10M": 0.8, "15M": 0.8, "20M": 0.8, "25M": 1.0, "30M": 1.0, "35M": 1.0, "45M": 1.0,
        "55M": 1.0,
    }  # fmt: skip
    assert column(development.BUNDLES, "k_bu") == [1.10, 1.20, 1.33]


def test_hook_tables() -> None:
    """A23.3-14, 12.5.3, from memory: 0.7, 0.8, 1.3, 1.2; ties that 12.5.4 asks for earn nothing."""
    assert column(hooks.COVER_FACTORS, "k_hc") == [0.7, 1.0]
    assert column(hooks.TIE_FACTORS, "k_ht") == [0.8, 1.0, 1.0]
    assert column(hooks.DENSITY_FACTORS, "k_hd") == [1.0, 1.3, 1.3]
    assert column(hooks.COATING_FACTORS, "k_he") == [1.2, 1.0]


@pytest.mark.parametrize("pair", ["NBC 2015 + A23.3-14", "NBC 2020 + A23.3:19"])
def test_hooks_of_the_editions_known(pair: str) -> None:
    """A23.3-14 and A23.3:19 share the hook of 100 d_b/sqrt(f'c)."""
    assert hooks.basic_length(code_pair(pair)) is hooks.BASIC


def test_hooks_of_2024_are_refused() -> None:
    """A23.3:24 has another expression; the old one is not reused, and the reason is given."""
    with pytest.raises(UserError, match=r"A23\.3:24 changed 12\.5 .* not known here"):
        hooks.basic_length(code_pair("NBC 2025 + A23.3:24"))


def test_service_cases() -> None:
    """NBC 2020 Table 4.1.3.4 for materials that creep; companion live load 0.35, storage 0.5."""
    table = [(c.dead, c.principal, {k.load: k.factor for k in c.companions}) for c in SERVICE_CASES]
    assert table == [
        (("1.0",), ("L", "1.0"), {"W": "0.3", "S": "0.35"}),
        (("1.0",), ("W", "1.0"), {"L": "0.35", "S": "0.35"}),
        (("1.0",), ("S", "1.0"), {"W": "0.3", "L": "0.35"}),
    ]
    text = specified(SERVICE_CASES[1], "w_s", companion="L", storage=True).text
    assert text == "w_s = 1.0*w_D + 1.0*w_W + 0.5*w_L"


def test_storage_companions() -> None:
    """NBC Table 4.1.3.2.-A: companion live load of storage areas is 1.5 and 1.0."""
    made = {
        n: factored(CASES[n - 1], "w_f", companion="L", storage=True).text.rpartition(" + ")[2]
        for n in (3, 4, 5)
    }
    assert made == {3: "1.5*w_L", 4: "1.0*w_L", 5: "1.0*w_L"}
    snow = factored(CASES[1], "w_f", companion="S", storage=True).text
    assert snow == factored(CASES[1], "w_f", companion="S").text


def test_areas_of_the_reduction() -> None:
    """NBC 4.1.5.8: above 80 m2 0.5 + sqrt(20/A), above 20 m2 0.3 + sqrt(9.8/B)."""
    areas = reduction.AREAS
    assert [areas.number(reduction.HEAVY, c) for c in ("A_0", "A_Lmin")] == [20, 80]
    assert [areas.number(reduction.OTHER, c) for c in ("A_0", "A_Lmin")] == [9.8, 20]


def test_where_live_load_is_reduced() -> None:
    """NBC 4.1.5.8: none for roofs and light assembly; every use of the table has its answer."""
    heavy = {
        "assembly area", "lobby or corridor", "exit", "exterior balcony", "retail area",
        "storage area", "factory", "library stack room", "garage, vehicles to 4000 kg",
        "garage, vehicles to 9000 kg", "garage, vehicles above 9000 kg",
    }  # fmt: skip
    none = {"roof", "classroom", "reading room"}
    for use in loads.USES.rows:
        q_L = loads.USES.number(use, "q_L") / 1e3
        made = reduction.reduction(use, q_L, "NBC 2020")
        expected = reduction.FACTOR_HEAVY if use in heavy else reduction.FACTOR_OTHER
        assert made is (None if use in none else expected), use


def test_slabs_and_light_assembly() -> None:
    """NBC 2020 forbids the reduction on slabs; assembly below 4.8 kPa has none."""
    assert reduction.reduction("office", 2.4e-3, "NBC 2020", slab=True) is None
    assert reduction.reduction("office", 2.4e-3, "NBC 2015", slab=True) is reduction.FACTOR_OTHER
    assert reduction.reduction("assembly area", 4.7e-3, "NBC 2020") is None
    assert reduction.reduction("assembly area", 4.8e-3, "NBC 2020") is reduction.FACTOR_HEAVY
    with pytest.raises(UserError, match=r"'ofice' is not a use .*did you mean 'office'"):
        reduction.reduction("ofice", 2.4e-3, "NBC 2020")


@pytest.mark.parametrize(
    ("table", "typed", "advice"),
    [
        # Closest letter by letter is S-2, another class.
        (EXPOSURES, "f-2", "did you mean 'F-2'? There are N, F-1,"),
        (GRADES, "400", "did you mean '400R' or '400W'? There are 400R, 400W, 500R, 500W"),
        (loads.USES, "Assembly area", "did you mean 'assembly area'?"),
        (
            loads.USES, "garage",
            ("did you mean 'garage, vehicles to 4000 kg' or 'garage, vehicles to 9000 kg' or "
            "'garage, vehicles above 9000 kg'?"),
        ),
        # Names with commas in a list of commas are quoted.
        (loads.USES, "barn", "'reading room', 'garage, vehicles to 4000 kg', "),
    ],
)  # fmt: skip
def test_a_row_that_is_not_there(table: LookupTable, typed: str, advice: str) -> None:
    with pytest.raises(UserError) as caught:
        table.row(typed, "x")
    assert advice in str(caught.value)
