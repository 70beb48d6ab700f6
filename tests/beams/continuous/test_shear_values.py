"""Independent checks 8 to 9b of the shear, through the flow: a beam built to have their pair.

Base beam: 350 x 600, d = 535, A_s = 2000, f'c 35, f_y 400, 10M stirrups at 225 mm, cover 40. The
expected numbers are hand calculations (independent checks no. 8, 8b, 9, 9b), written out again in
tests/standards/worked_shear.py.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np
import pytest

from lineproof.beams.analysis.model import UniformLoad
from lineproof.beams.continuous.shear_check import SpanCheck
from lineproof.beams.continuous.shear_numbers import ShearBasis, SpanEnd
from lineproof.beams.continuous.shear_state import span_state
from lineproof.beams.continuous.stirrups import Band
from lineproof.beams.continuous.stirrups_choice import Choice

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .shear_models import CHECKED, DEAD_ONLY, Case, case_of, check_zones, new_sheet, number, record

X_V = 100 + 481.5
"""Critical section from the axis of a support 200 mm wide."""
W_LOAD = (160e6 - 260e3 * X_V) * 2 / X_V**2
LENGTH = 2 * (260e3 / W_LOAD + X_V)


def checked_beam() -> Case:
    """Return a span under uniform load with V = 260 kN and M = 160 kN.m at d_v from the face.

    M = R x - w x2/2 and V = R - w x give w = 2 (M - V x)/x2, and R = w l/2 = V + w x.
    """
    return case_of(
        (LENGTH,), [UniformLoad("D", 1, W_LOAD)], width=200.0, h=600.0, bottom=(2000.0, 535.0),
        top=(600.0, 535.0), ends=(SpanEnd(exterior=True, A_bearing=1000.0),) * 2,
        combinations=DEAD_ONLY,
    )  # fmt: skip


def checked(basis: ShearBasis) -> Choice:
    """Return the beam with its 10M at 225 mm, as given."""
    case = checked_beam()
    return check_zones(case, basis, [{"span": 1, "spacing": "225 mm"}])


@pytest.mark.parametrize("end", [0, -1])
def test_check_9_general_method(end: int) -> None:
    section = checked(CHECKED).sections[0][end]
    values = section.values
    assert values["M_f"] == pytest.approx(160e6)
    assert values["V_f"] == pytest.approx(260e3)
    assert section.distance == pytest.approx(581.5)
    assert values["eps_x"] == pytest.approx(0.740e-3, abs=5e-7)
    assert values["beta"] == pytest.approx(0.1895, abs=5e-5)
    assert values["theta"] == pytest.approx(34.18, abs=5e-3)
    assert values["V_c"] == pytest.approx(122.8e3, abs=50)
    assert values["V_s"] == pytest.approx(214.3e3, abs=50)
    assert values["V_r"] == pytest.approx(122.8e3 + 214.3e3, abs=100)


def test_check_8_simplified_method() -> None:
    choice = checked(replace(CHECKED, method="simplified"))
    values = choice.sections[0][0].values
    assert values["V_c"] == pytest.approx(116.6e3, abs=60)
    assert values["V_s"] == pytest.approx(207.8e3, abs=60)
    assert values["V_r"] == pytest.approx(324.5e3, abs=60)
    assert values["V_rmax"] == pytest.approx(958.5e3, abs=60)
    assert values["s_max"] == pytest.approx(337, abs=0.5)
    assert choice.checks[0].state.minimum_spacing == pytest.approx(644, abs=0.5)


def test_check_9b_bars_along_the_beam() -> None:
    """F_lt 555.2 kN of a span section, 222.9 kN and 656 mm2 at the end support."""
    case, basis = checked_beam(), replace(CHECKED, method="simplified")
    choice = checked(basis)
    values = choice.sections[0][0].values
    assert values["F_lt"] == pytest.approx(555.2e3, abs=60)
    assert values["F_le"] == pytest.approx(222.9e3, abs=60)
    assert choice.sections[0][0].use["bearing"] == pytest.approx(656 / 1000, abs=1e-3)
    made = record(new_sheet(basis), case, choice)
    assert number(made, "shear-1-left/A_le") == pytest.approx(656, abs=1)
    assert not list(faults(made.data))


@pytest.mark.parametrize(("a_max", "beta", "V_r"), [(20.0, 0.1552, 100.6), (14.0, 0.1455, 94.27)])
def test_check_8b_without_stirrups(a_max: float, beta: float, V_r: float) -> None:
    """Beta 0.1552 and V_c 100.6 kN with 20 mm aggregate; 0.1455 with 14 mm (s_ze 581.1).

    0.65 x 230/1581.1 x sqrt(35) x 350 x 481.5 = 0.65 x 0.145468 x 5.91608 x 168.525 = 94.27 kN.
    """
    case, basis = checked_beam(), replace(CHECKED, method="simplified", a_max=a_max)
    choice = check_zones(case, basis, [])
    section = choice.sections[0][0]
    assert section.plain
    assert section.values["beta"] == pytest.approx(beta, abs=5e-5)
    assert section.values["V_r"] == pytest.approx(V_r * 1e3, abs=60)
    made = record(new_sheet(basis), case, choice)
    if a_max < 20:
        assert number(made, "shear-1-left/s_ze") == pytest.approx(581.1, abs=1)
    assert not list(faults(made.data))


@pytest.mark.parametrize(("V", "halved"), [(479.1e3, False), (479.4e3, True)])
def test_check_8_high_shear_halves_the_spacing(V: float, halved: bool) -> None:  # noqa: FBT001
    """The limit 0.125 lambda phi_c f'c b_w d_v is 479.2 kN; 337 mm becomes 168.5 mm."""
    length = 6000.0
    w = V / (length / 2 - X_V)
    case = case_of(
        (length,), [UniformLoad("D", 1, w)], width=200.0, h=600.0, bottom=(9000.0, 535.0),
        top=(600.0, 535.0), combinations=DEAD_ONLY,
    )  # fmt: skip
    state = span_state(CHECKED, case.spans[0], case.forces)
    assert state.v["V_f"][0, 0] == pytest.approx(V)
    assert state.v["s_max"][0, 0] == pytest.approx(168.525 if halved else 337.05)


def test_beside_a_change_the_stirrups_count_less() -> None:
    """11.3.7, by hand: 150 beside 300, h 600; 120 mm from the change 1/(0.7/150 + 0.3/300)."""
    bands = (Band(0.0, 1000.0, 150.0), Band(1000.0, LENGTH - 200, 300.0))
    case = checked_beam()
    check = SpanCheck(span_state(CHECKED, case.spans[0], case.forces), bands)
    at = dict(zip((check.u).round(6).tolist(), (1 / check.effective[0]).tolist(), strict=True))
    assert at[650.0] == pytest.approx(150.0)
    assert at[700.0] == pytest.approx(150.0)
    assert at[850.0] == pytest.approx(1 / (0.75 / 150 + 0.25 / 300))
    assert at[1000.0] == pytest.approx(300.0)
    assert at[1050.0] == pytest.approx(300.0)
    assert np.isfinite(check.strength).all()
