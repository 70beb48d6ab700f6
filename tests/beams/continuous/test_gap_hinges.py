"""Hinges of the beam of ``test_gaps``: where it cracks without bars under loads of another span."""

from __future__ import annotations

import pytest

from lineproof.record.recompute import recompute

from .test_gaps import built, row


def test_loads_that_deflect_another_span_crack_this_one_too() -> None:
    """Top bars are missing in span 1 from 3.5 to 4.9 m, live load on span 2 cracks it there.

    Half of it sustained: M_B = -(19.8*6**2/8 + 7.2*6**2/16) = -105.3 kN.m; at 4.9 m
    19.8*4.9*1.1/2 - 105.3*4.9/6 = -32.63 kN.m against 27.39. Live load on span 1 leaves -7 kN.m.
    """
    top = [row("top", "2-15M", -0.1, 3.5), row("top", "4-25M", 4.9, 12.1)]
    _, sheet = built([row("bottom", "4-20M", -0.1, 12.1), *top])
    record = sheet.close()
    made = sheet.entries_of("deflection-1")
    M_s = 19.8e6 * 4.9 * 1.1 / 2 - 105.3e6 * 4.9 / 6
    assert made["x_f"].value == 4900
    assert made["M_s"].value == pytest.approx(M_s, rel=1e-9)
    assert str((made["M_s"].extra or {})["title"]).endswith("live load as for span 2")
    failed = {"deflection-1/deflection-whole-top", "deflection-2/deflection-whole-top"}
    assert failed <= set(record.failed)
    assert recompute(record) == []
