"""Crack control by the stress under specified loads, where 0.6 f_y does not do (10.6.1)."""

from __future__ import annotations

from typing import Any

import pytest

from lineproof.sheet import Sheet

from .flow import PROJECT, run, start

FLEXURE = ("loads", "spans", "analysis", "flexure")
WET: dict[str, Any] = {"exposure": "C-1", "cover": "60 mm", "f_c": "35 MPa", "grade": "500R"}


def garage(**changes: Any) -> Sheet:
    """Two spans of 8 m, T, 400 x 650, slab 160, bars of 500 MPa under 60 mm of cover."""
    inputs = {
        "spans": ["8 m", "8 m"], "supports": ["wall 300 mm", "girder 400 mm", "wall 300 mm"],
        "columns": None, "h": "650 mm", "b_w": "400 mm", "h_f": "160 mm", "spacing": "3 m",
        "superimposed": "1.5 kPa", "use": "office", **WET,
    }  # fmt: skip
    return run(start(project=PROJECT, **inputs | changes), FLEXURE)


def test_the_stress_is_that_of_the_largest_specified_moment_by_hand() -> None:
    """Statics of two equal spans: M_2 = -w l^2/8 of load on both, half of it of load on one.

    Span 1 under D on both and L on span 1, axis moment M_2 = (w_D + w_L/2) 64/8; then
    V = w_s l/2 - M_2/l, x = V/w_s, M_s = V^2/(2 w_s). The stress is M_s over A_s and its arm
    d - kd/3, with kd from the moments of area about the axis: b kd^2/2 = n A_s (d - kd).
    """
    sheet = garage()
    e = sheet.entries_of("sag-1")
    D, L = (sheet.entry(f"loads/w_{kind}1").value for kind in "DL")
    left, right = e["stress-allowance"].value
    assert left > right == 25_000
    M_2, w_s = (D + L / 2) * 64e6 / 8, D + L
    V = w_s * 8000 / 2 - M_2 / 8000
    M_s = V * V / (2 * w_s)
    assert e["M_s"].value == pytest.approx(M_s, rel=1e-9)
    b = sheet.entry("span-1/b_f").value
    n, A_s, d, kd = (e[name].value for name in ("n_E", "A_s", "d", "kd"))
    assert b * kd**2 / 2 == pytest.approx(n * A_s * (d - kd), rel=1e-9)
    assert kd < 160  # a rectangle of width b
    f_s = M_s / (A_s * (d - kd / 3))
    assert e["f_s"].value == pytest.approx(f_s, rel=1e-9)
    assert e["z"].value == pytest.approx(
        f_s * (e["d_c"].value * e["A_e"].value) ** (1 / 3), rel=1e-9
    )
    assert bool(e["crack-control"])


def test_at_a_face_the_moment_is_that_of_load_on_both_spans() -> None:
    """M_2 = (w_D + w_L) l^2/8; at the face, 0.2 m from the axis, M = M_2 - V 0.2 + w 0.2^2/2."""
    sheet = garage()
    e = sheet.entries_of("hog-2-left")
    assert "stress-allowance" in e
    w_s = sum(sheet.entry(f"loads/w_{kind}1").value for kind in "DL")
    M_2 = w_s * 64e6 / 8
    V = w_s * 8000 / 2 + M_2 / 8000
    assert e["M_s"].value == pytest.approx(M_2 - V * 200 + w_s * 200**2 / 2, rel=1e-9)
    n, A_s, d, kd = (e[name].value for name in ("n_E", "A_s", "d", "kd"))
    assert 400 * kd**2 / 2 == pytest.approx(n * A_s * (d - kd), rel=1e-9)  # the web is compressed
    assert e["f_s"].value == pytest.approx(e["M_s"].value / (A_s * (d - kd / 3)), rel=1e-9)


def test_where_the_allowance_does_nothing_is_calculated() -> None:
    e = garage(exposure="N", cover="40 mm", grade="400R").entries_of("sag-1")
    assert e["f_s"].value == pytest.approx(0.6 * 400)
    assert {"M_s", "stress-allowance"}.isdisjoint(e)
