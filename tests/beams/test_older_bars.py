"""Bars of no grade of today: their yield strength is typed and used throughout."""

from __future__ import annotations

import pytest

from lineproof.beams.steel import bends_as, yield_strength

from .continuous import flow
from .continuous.notebooks import EXISTING_BEAM, inputs_of
from .gallery import record_of
from .pocket import faults


def test_strength_and_bends() -> None:
    """40 ksi is 40 000 x 4.4482216 N / 645.16 mm2 = 275.79 MPa; bends of older bars as R."""
    assert yield_strength("500W") == 500
    assert yield_strength("300 MPa") == 300
    assert yield_strength("40 ksi") == pytest.approx(40000 * 4.4482216 / 645.16, rel=1e-7)
    assert [bends_as(grade) for grade in ("400R", "500W", "300 MPa")] == ["R", "W", "R"]


def test_one_span() -> None:
    """4-25M of 300 MPa: a = 0.85 x 2000 x 300/(16.6816 x 3100) = 9.862 mm."""
    record = record_of(grade="300 MPa", bottom_bars="4-25M")
    a = 0.85 * 2000 * 300 / (16.6816 * 3100)
    M_r = 0.85 * 2000 * 300 * (566.1 - a / 2) / 1e6
    assert record.entries["flexure/M_r"]["value"] == pytest.approx(M_r, rel=1e-6)
    assert record.entries["materials/f_y"]["kind"] == "given"
    assert "deformed" in record.entries["materials/older-bars"]["text"]
    assert list(faults(record.data)) == []


def test_an_existing_beam() -> None:
    """Stirrups and development too: V_s by 300 MPa, l_d in proportion to f_y, simplified shear.

    Two legs 10M at 250 mm, theta 35 degrees, d_v = max(0.9 d, 0.72 h) = 494.055 mm.
    """
    old = inputs_of(EXISTING_BEAM) | {"live_load": "4.8 kPa", "shear_method": "simplified"}
    records = {f_y: flow.record_of(**old | {"grade": f_y}) for f_y in ("300 MPa", "400R")}
    new, record = records["400R"].entries, records["300 MPa"].entries
    place = "shear-1-left"
    V_s = 0.85 * 200 * 300 * 0.9 * 548.95 / 0.7002075 / 250 / 1e3
    assert record[f"{place}/V_s"]["value"] == pytest.approx(V_s, rel=1e-6)
    lengths = [key for key in new if key.endswith("/l_d0")]
    assert lengths
    for key in lengths:
        assert record[key]["value"] == pytest.approx(0.75 * new[key]["value"], rel=1e-9)
