"""An existing beam asked for far more than it carries: shown as failing to the end, not refused.

The beam of `calcs/existing-beam.ipynb`: two spans of 7.2 m, 350 x 600 mm, 25 MPa, on walls and a
column of 400 mm. alpha_1 phi_c f'c = (0.85 - 0.0015 x 25) 0.65 x 25 = 13.203 MPa.
"""

from __future__ import annotations

import pytest
from tests.beams.pocket import faults

from lineproof.record import recompute

from .flow import record_of
from .notebooks import EXISTING_BEAM, inputs_of


def test_moment_that_no_bars_balance() -> None:
    """22 kPa over the column: 711 kN.m at its face, where the concrete balances 696.3 kN.m.

    w_f = 1.25 x 17.132 + 1.5 x 70.4 = 127.015 kN/m (slab 130 mm, web 470 mm, 1 kPa; 3.2 m wide);
    M = w L**2/8 = 823.06 at the axis; V = w L/2 + M/L = 571.57 kN; at 0.2 m
    823.06 - 571.57 x 0.2 + 127.015 x 0.02 = 711.28 kN.m. d = 600 - 30 - 11.3 - 19.5/2 = 548.95 mm.
    """
    record = record_of(**inputs_of(EXISTING_BEAM) | {"live_load": "22 kPa"})
    place = "hog-2-left"
    at = {n: record.entries[f"{place}/{n}"]["value"] for n in ("M_f", "M_rc", "a_r", "A_sr")}
    assert at["M_f"] == pytest.approx(711.28, rel=1e-4)
    assert at["M_rc"] == pytest.approx(13.203125 * 350 * 548.95**2 / 2e6, rel=1e-9)
    assert at["a_r"] == 548.95
    assert at["A_sr"] == pytest.approx(13.203125 * 350 * 548.95 / (0.85 * 400), rel=1e-9)
    assert not record.entries[f"{place}/concrete-balances"]["holds"]
    assert f"{place}/strength" in record.failed
    assert list(faults(record.data)) == []
    assert recompute(record) == []


@pytest.mark.parametrize("live_load", ["12 kPa", "15 kPa", "18 kPa", "40 kPa"])
def test_whatever_is_asked(live_load: str) -> None:
    """Every part is made once and every line followed by calculator, however much is asked for."""
    record = record_of(**inputs_of(EXISTING_BEAM) | {"live_load": live_load})
    assert "hog-2-left/strength" in record.failed
    assert list(faults(record.data)) == []
