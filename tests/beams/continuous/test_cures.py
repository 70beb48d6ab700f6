"""Cures: the nearest value that can be built, verified; one step less fails; none where none."""

from __future__ import annotations

import math
from collections.abc import Mapping

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from lineproof.beams.continuous import cures as found_by
from lineproof.beams.continuous import cures_checks as checks
from lineproof.beams.continuous import deflection as numbers
from lineproof.beams.continuous.cures import Cure, Utilisation, Variable, cures, told
from lineproof.beams.continuous.deflection_service import STAGES, StageMoments
from lineproof.errors import UserError

# The base beam of the independent checks; alpha_1 phi_c f'c b = 0.7975*0.65*35*350 = 6350.1 N/mm.
BASE = {
    "f_c": 35.0, "f_y": 400.0, "phi_c": 0.65, "phi_s": 0.85, "lambda_": 1.0, "E_s": 200000.0,
    "b": 350.0, "b_w": 350.0, "h_f": 0.0, "h": 600.0, "d": 535.0, "A_s": 2000.0, "A_v": 200.0,
    "s": 225.0, "beta": 0.18, "theta": 35.0,
}  # fmt: skip


def verified(use: Utilisation, variables: Mapping[str, Variable]) -> dict[str, float | None]:
    """Return the cures after checking each: it holds with the value, not with one step less."""
    made = {}
    for cure in cures(use, variables):
        made[cure.symbol] = cure.value
        if cure.value is None:
            continue
        values = variables[cure.symbol].values
        place = values.index(cure.value)
        assert use({cure.symbol: cure.value}) <= 1 + 1e-12
        if place:
            assert use({cure.symbol: values[place - 1]}) > 1
    return made


def test_bending() -> None:
    """M_f 360 against 327.4 kN.m (independent check no. 5a).

    Steel: a_r = 535 - sqrt(535^2 - 2*360e6/6350.1) = 119.2, A_s = 6350.1*119.2/340 = 2226 -> 2230,
    5-25M. Depth: d = 360e6/680000 + 107.08/2 = 582.95, h = 647.95 -> 650. Width and strength only
    shorten the block: 680000*535 = 363.8 kN.m at most, b = 350*107.08/11.18 = 3353, far off.
    """
    use = checks.bending(BASE | {"M_f": 360e6})
    variables = {
        "A_s": found_by.steel(2000, "25M"),
        "h": found_by.depth(600),
        "b_w": found_by.width(350),
        "f_c": found_by.concrete(35),
    }

    assert use({}) == pytest.approx(360 / 327.4, rel=1e-4)
    assert verified(use, variables) == {"A_s": 2230, "h": 650, "b_w": None, "f_c": None}
    # the bars yield up to c = 0.636 d = 340.45 mm: a = 0.8825 c = 300.45 mm, A_s = 6350.1 a/340 =
    # 5611 mm2, less than the 4 x 2000 mm2 looked at: "or more" alone is told of the depth only
    assert told(cures(use, variables)) == (
        "It would hold with any one of these alone, all else and the loads, self weight too, as "
        "they are: (a) 2230 mm² of bars (5-25M) or more, up to 5610 mm²; (b) a depth of 650 mm or "
        "more. No width of the web up to 1500 mm and no concrete up to 80 MPa would do."
    )


def test_bending_of_a_tee() -> None:
    """Independent check no. 5b: 1220.4 kN.m; one grain more asks for steel, which fails to yield.

    c/d 0.448 of 0.636; C_f 1088.6 kN. M_f 1250: steel 7000 -> by the quadratic of the web.
    """
    tee = BASE | {"b": 900.0, "b_w": 300.0, "h_f": 100.0, "d": 600.0, "h": 680.0, "A_s": 7000.0}
    use = checks.bending(tee | {"M_f": 1250e6})
    made = verified(use, {"A_s": found_by.steel(7000, "35M"), "h": found_by.depth(680)})
    stress = 0.7975 * 0.65 * 35
    C_f = stress * 600 * 100
    a_w = 600 - math.sqrt(600**2 - 2 * (1250e6 - C_f * 550) / (stress * 300))
    A_s = (C_f + stress * 300 * a_w) / (0.85 * 400)

    assert use({}) == pytest.approx(1250 / 1220.4, rel=1e-4)
    assert made["A_s"] == math.ceil(A_s / 10) * 10


def test_yielding() -> None:
    """c/d 700/1100: c 340.5, a 300.5, A_s = 6350.1*300.5/340 = 5611 -> 11-25M of 12-25M."""
    use = checks.yielding(BASE | {"A_s": 6000.0})
    made = cures(use, {"A_s": found_by.less_steel(6000, "25M"), "f_c": found_by.concrete(35)})

    assert use({}) > 1
    assert (made[0].value, made[0].text) == (5500, "5500 mm² of bars or less (11-25M)")
    assert made[1].value == 40
    assert checks.yielding(BASE | {"A_s": 4000.0}, c_d=0.4)({}) > 1


def test_shear_strength_simplified() -> None:
    """Independent check no. 8: V_c 116.6, V_s 207.8 kN at 225; V_f 350 kN.

    s = 225*207.8/233.4 = 200.3 -> 200; d_v = 481.5*350/324.5 = 519.4, d = 577.1, h = 642.1 -> 650;
    f'c: V_c 142.2 kN asks for (142.2/116.6)^2*35 = 52.1 -> 55 MPa; b_w = 350*142.2/116.6 = 426.9.
    """
    use = checks.shear_strength(BASE | {"V_f": 350e3})
    variables = {
        "s": found_by.spacing(225), "h": found_by.depth(600), "f_c": found_by.concrete(35),
        "b_w": found_by.width(350),
    }  # fmt: skip

    assert use({}) == pytest.approx(350 / 324.5, rel=1e-3)
    assert verified(use, variables) == {"s": 200, "h": 650, "f_c": 55, "b_w": 430}


def test_shear_strength_general() -> None:
    """Independent check no. 9: eps_x 0.740e-3, V_c 122.8, V_s 214.3 = 337.1 kN at V_f 260."""
    use = checks.shear_strength(BASE | {"V_f": 260e3, "M_f": 160e6})
    more = checks.shear_strength(BASE | {"V_f": 330e3, "M_f": 160e6})
    made = verified(more, {"A_s": found_by.steel(2000, "25M"), "s": found_by.spacing(225)})

    assert use({}) == pytest.approx(260 / 337.1, rel=1e-3)
    assert more({}) > 1
    assert made["s"] == 200
    assert made["A_s"] is not None


def test_stirrup_spacing() -> None:
    """Independent check no. 8: s_max 337; above 479.2 kN half of it, 168.5 -> 150 mm."""
    use = checks.stirrup_spacing(BASE | {"V_f": 500e3})
    variables = {"s": found_by.spacing(225)}

    assert checks.stirrup_spacing(BASE | {"V_f": 260e3})({}) == pytest.approx(225 / 337.05)
    assert use({}) == pytest.approx(225 / 168.525)
    assert verified(use, variables) == {"s": 150}


def test_minimum_stirrups() -> None:
    """Independent check no. 8: 644 mm is the spacing for the minimum; 700 given."""
    use = checks.least_stirrups(BASE | {"s": 700.0})
    assert verified(use, {"s": found_by.spacing(700)}) == {"s": 625}


SECTION = numbers.SpanSection(
    l=7000, l_n=6600, h=600, b_w=350, h_f=0, I_g=6.3e9, y_b=300, f_r=0.6 * 35**0.5,
    E_c=4500 * 35**0.5, E_s=200000, midspan=numbers.Place(350, 535, 2000), left=None, right=None,
)  # fmt: skip
MOMENTS = {
    stage: StageMoments(M, 0, 0) for stage, M in zip(STAGES, (120e6, 150e6, 190e6), strict=True)
}


def test_deflection() -> None:
    """What is attached: each cure recomputed; a deeper beam by the section written out anew."""
    use = checks.deflecting(SECTION, MOMENTS, carries=numbers.DAMAGED, f_c=35)
    variables = {
        "h": found_by.depth(600), "A_s": found_by.steel(2000, "25M"), "f_c": found_by.concrete(35),
        "b_w": found_by.width(350),
    }  # fmt: skip
    made = verified(use, variables)
    h = made["h"]

    assert use({}) > 1
    assert h is not None
    deeper = numbers.SpanSection(
        l=7000, l_n=6600, h=h, b_w=350, h_f=0, I_g=350 * h**3 / 12, y_b=h / 2, f_r=0.6 * 35**0.5,
        E_c=4500 * 35**0.5, E_s=200000, midspan=numbers.Place(350, h - 65, 2000), left=None,
        right=None,
    )  # fmt: skip
    again = numbers.deflections(deeper, MOMENTS, carries=numbers.DAMAGED)
    assert use({"h": h}) == pytest.approx(again.utilisation, rel=1e-12)
    assert use({"f_c": 35.0}) == pytest.approx(use({}), rel=1e-12)


def test_deflection_of_a_tee_keeps_its_flange() -> None:
    """A wider web widens the flange as much; the gross section follows, of a cantilever too."""
    tee = numbers.SpanSection(
        l=7000, l_n=6600, h=600, b_w=300, h_f=100, I_g=0, y_b=0, f_r=3.5, E_c=26600, E_s=200000,
        midspan=numbers.Place(900, 535, 2000), left=None, right=None,
    )  # fmt: skip
    # by hand: A 240 000, y_b = (180000*300 + 60000*550)/240000 = 362.5;
    # I = 300*600^3/12 + 180000*62.5^2 + 600*100^3/12 + 60000*187.5^2 = 8.2625e9
    made = checks._gross(tee, tee)
    assert made.y_b == pytest.approx(362.5)
    assert made.I_g == pytest.approx(8.2625e9, rel=1e-5)
    tip = numbers.SpanSection(
        l=2000, l_n=1800, h=600, b_w=300, h_f=100, I_g=8.2625e9, y_b=362.5, f_r=3.5, E_c=26600,
        E_s=200000, midspan=None, left=numbers.Place(300, 540, 2000), right=None, free="right",
    )  # fmt: skip
    assert checks._flange_width(tip) == pytest.approx(900)


@settings(max_examples=100, deadline=None, derandomize=True, database=None)
@given(start=st.integers(200, 900), need=st.floats(201, 2900))
def test_nearest_step_is_found(start: int, need: float) -> None:
    """Of a plain threshold: the least multiple of 10 above both; none beyond the limit."""
    cure = cures(lambda x: need / x["h"], {"h": found_by.depth(start, 2000)})[0]
    nearest = max(math.ceil(need / 10), start // 10 + 1) * 10

    assert cure.value == (nearest if nearest <= 2000 else None)


def test_or_more_only_where_more_does() -> None:
    """A check that holds between 700 and 900 alone, even narrower than a long step."""

    def window(x: Mapping[str, float]) -> float:
        return 0.9 if 700 <= x["h"] <= 900 else 1.1

    def narrow(x: Mapping[str, float]) -> float:
        return 0.9 if x["h"] == 690 else 1.1

    assert cures(window, {"h": found_by.depth(600)})[0].text == "a depth of 700 mm"
    assert cures(narrow, {"h": found_by.depth(600)})[0].value == 690


def test_whole_bars_must_hold_too() -> None:
    """2010 mm2 would do, but 5-25M are 2500: too many; at 2510 mm2 six bars are 3000, too many."""

    def use(x: Mapping[str, float]) -> float:
        return 0.9 if 2010 <= x["A_s"] <= 2400 else 1.1

    assert cures(use, {"A_s": found_by.steel(2000, "25M")})[0] == Cure(
        "A_s", None, "no area of bars up to 8000 mm²"
    )


def test_what_cannot_be_computed_is_no_cure() -> None:
    def refuses(x: Mapping[str, float]) -> float:
        if x["h"] < 650:
            msg = "h: too shallow"
            raise UserError(msg)
        return math.nan if x["h"] < 660 else 0.5

    assert cures(refuses, {"h": found_by.depth(600)})[0].value == 660
    assert cures(lambda x: 1 / (x["h"] - x["h"]), {"h": found_by.depth(600)})[0].value is None


def test_sentences() -> None:
    one = Cure("h", 670.0, "a depth of 670 mm or more", 0.99)
    no = Cure("f_c", None, "no concrete up to 80 MPa")

    assert told([one]) == (
        "It would hold with a depth of 670 mm or more, all else and the loads, self weight too, as "
        "they are."
    )
    assert told([no]) == "No concrete up to 80 MPa would do alone."
    assert told([]) == ""
