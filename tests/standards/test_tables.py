"""Tables of the catalogue, digit by digit against an independent copy of each, source named."""

from __future__ import annotations

import pytest

from lineproof.errors import UserError
from lineproof.standards.a23_3 import bars, cover, crack_control, materials
from lineproof.standards.codes import CODE_PAIRS, code_pair
from lineproof.standards.nbc import combinations, loads, reduction
from lineproof.standards.references import NBC_LOADS, NBC_SERVICE


def test_bars() -> None:
    """CSA G30.18 bars: diameter mm and area mm2 (public table of Canadian bars)."""
    expected = {
        "10M": (11.3, 100), "15M": (16.0, 200), "20M": (19.5, 300), "25M": (25.2, 500),
        "30M": (29.9, 700), "35M": (35.7, 1000), "45M": (43.7, 1500), "55M": (56.4, 2500),
    }  # fmt: skip
    found = {s: (bars.BARS.number(s, "d_b"), bars.BARS.number(s, "A_b")) for s in bars.BARS.rows}
    assert found == expected


def test_grades() -> None:
    """CSA G30.18-09: 400R, 400W, 500R, 500W."""
    found = {grade: bars.GRADES.number(grade, "f_y") for grade in bars.GRADES.rows}
    assert found == {"400R": 400, "400W": 400, "500R": 500, "500W": 500}


def test_stirrup_bends() -> None:
    """A23.1, from memory: bend diameters 10M 45 and 15M 65 mm, so radii 22.5 and 32.5."""
    found = {size: bars.STIRRUP_BENDS.number(size, "r_s") for size in bars.STIRRUP_BENDS.rows}
    assert found == {"10M": 22.5, "15M": 32.5}


def test_material_tables() -> None:
    """A23.3, from memory: phi_c 0.65, phi_s 0.85; lambda 1.00, 0.85, 0.75; E_s, eps_cu."""
    factors = materials.RESISTANCE_FACTORS.rows["cast in place"]
    assert (float(factors["phi_c"]), float(factors["phi_s"])) == (0.65, 0.85)
    density = materials.DENSITY_FACTORS
    assert [density.number(row, "lambda_") for row in ("normal", "semi-low", "low")] == [
        1,
        0.85,
        0.75,
    ]
    assert materials.CONSTANTS.number("reinforcement", "E_s") == 200000
    assert materials.CONSTANTS.number("concrete", "eps_cu") == 0.0035
    assert (materials.LEAST_F_C, materials.MOST_F_C) == (20, 80)


@pytest.mark.parametrize(
    ("classes", "c_min", "ratio"),
    [
        (("N",), 30, 1.0),
        (("F-1", "F-2", "S-1", "S-2", "S-3"), 40, 1.5),
        (("C-XL", "C-1", "C-3", "C-4", "A-1", "A-2", "A-3", "A-4"), 60, 2.0),
    ],
)
def test_durability_cover(classes: tuple[str, ...], c_min: float, ratio: float) -> None:
    """A23.1 Table 17, beams: cover 30, 40, 60 mm; over bar or aggregate 1.0, 1.5, 2.0."""
    for name in classes:
        row = {k: float(v) for k, v in cover.EXPOSURES.rows[name].items()}
        assert (row["c_min"], row["r_cb"], row["r_ca"]) == (c_min, ratio, ratio)


def test_least_strength_by_exposure() -> None:
    """A23.1 Tables 1 and 2, from memory."""
    found = {name: cover.EXPOSURES.number(name, "f_cmin") for name in cover.EXPOSURES.rows}
    assert found == {
        "N": 20, "F-1": 30, "F-2": 25, "S-1": 35, "S-2": 32, "S-3": 30, "C-XL": 50, "C-1": 35,
        "C-3": 30, "C-4": 25, "A-1": 35, "A-2": 32, "A-3": 30, "A-4": 25,
    }  # fmt: skip


def test_fire_tables() -> None:
    """NBC 2020, Division B, Appendix D: D-2.9 cover of beams, slabs of type S and N."""
    hours = ("0.5 h", "0.75 h", "1 h", "1.5 h", "2 h", "3 h", "4 h")
    found = [cover.FIRE_COVER.number(h, "c_fire") for h in hours]
    assert found == [20, 20, 20, 25, 25, 39, 50]
    assert [cover.FIRE_SLAB.number(h, "S") for h in hours] == [60, 77, 90, 112, 130, 158, 180]
    assert [cover.FIRE_SLAB.number(h, "N") for h in hours] == [59, 74, 87, 108, 124, 150, 171]
    assert tuple(cover.FIRE_COVER.rows) == hours


def test_crack_limits() -> None:
    """A23.3, 10.6, from memory: z 30 000 and 25 000 N/mm; skin 0.008 and 0.010."""
    found = {k: [float(v) for v in row.values()] for k, row in crack_control.LIMITS.rows.items()}
    assert found == {"interior": [30000, 0.008], "exterior": [25000, 0.010]}
    assert crack_control.SKIN_SPACING_MOST == 200


def test_live_loads() -> None:
    """NBC 2020, Division B, Table 4.1.5.3 (same values in the NBC 2015 format), kPa."""
    expected = {
        4.8: ("assembly area", "lobby or corridor", "exit", "retail area", "storage area",
              "kitchen", "exterior balcony", "office at grade or in a basement"),
        2.4: ("classroom", "office", "garage, vehicles to 4000 kg"),
        1.9: ("residential area", "patients' room"),
        3.6: ("operating room or laboratory", "equipment room"),
        6.0: ("factory", "garage, vehicles to 9000 kg"),
        7.2: ("library stack room",),
        2.9: ("reading room",),
        12.0: ("garage, vehicles above 9000 kg",),
        1.0: ("roof",),
    }  # fmt: skip
    found = {use: loads.USES.number(use, "q_L") for use in loads.USES.rows}
    assert found == {use: q for q, uses in expected.items() for use in uses}
    assert loads.UNIT_WEIGHT.number("reinforced, normal density", "gamma_w") == 24


def test_code_pairs_are_locked() -> None:
    """NBC 2015 with A23.3-14, NBC 2020 with A23.3:19, NBC 2025 with A23.3:24; no other mix."""
    assert {(p.building, p.concrete) for p in CODE_PAIRS.values()} == {
        ("NBC 2015", "CSA A23.3-14"), ("NBC 2020", "CSA A23.3:19"), ("NBC 2025", "CSA A23.3:24"),
    }  # fmt: skip
    assert code_pair("NBC 2015 +  A23.3-14").concrete == "CSA A23.3-14"
    for mix in ("NBC 2015 + A23.3:19", "NBC 2020 + A23.3-14", "", None, "NBC 2020"):
        with pytest.raises(UserError, match="is not a locked code pair; write one of 'NBC 2015"):
            code_pair(mix)
    changed = {name: [c for c, _ in pair.changed] for name, pair in CODE_PAIRS.items()}
    assert changed["NBC 2015 + A23.3-14"] == []
    assert "10.5.2" in changed["NBC 2020 + A23.3:19"]


def test_every_article_taken_from_nbc_2020_is_unseen_in_nbc_2025() -> None:
    """No text of NBC 2025 was read: what the catalogue has from NBC 2020 is to be confirmed.

    4.1.4.1 and Appendix D are on the list of every package, as from memory in other editions.
    """
    pair = CODE_PAIRS["NBC 2025 + A23.3:24"]
    named = {clause for clause, _ in (*pair.changed, *pair.changed_beyond)}
    used = {
        each.clause
        for module in (combinations, loads, reduction)
        for each in (*module.FORMULAS, *getattr(module, "TABLES", ()))
        if each.basis in (NBC_LOADS, NBC_SERVICE)
    }
    assert {"NBC 4.1.3.2", "NBC 4.1.5.8"} <= used
    assert used <= named
