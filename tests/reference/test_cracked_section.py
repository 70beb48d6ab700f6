"""Cracked sections against scipy (axis by root) and shapely (area and inertia of what is left)."""

from __future__ import annotations

import itertools

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.optimize import brentq
from shapely.geometry import Polygon, box

from lineproof.standards.a23_3 import deflection

from .calculator import value

few = settings(max_examples=100, deadline=None, derandomize=True, database=None)


@st.composite
def sections(draw: st.DrawFn) -> dict[str, float]:
    """Draw a section with its top compressed; ``b`` equals ``b_w`` for a web in negative moment."""
    b_w = float(draw(st.integers(200, 600)))
    h = float(draw(st.integers(300, 1200)))
    return {
        "b": b_w + draw(st.integers(0, 2000)), "b_w": b_w, "h": h, "d": 0.9 * h, "d_p": 50.0,
        "h_f": float(draw(st.integers(60, 200))), "A_s": draw(st.floats(0.003, 0.03)) * b_w * h,
        "A_sp": draw(st.floats(0.0005, 0.01)) * b_w * h, "n_E": draw(st.floats(5.5, 10)),
    }  # fmt: skip


def outline(x: dict[str, float], *, flange: bool) -> Polygon:
    """Return the concrete, depth downwards from the compression face."""
    if not flange:
        return box(0, 0, x["b"], x["h"])
    return box(0, 0, x["b_w"], x["h"]).union(box(0, 0, x["b"], x["h_f"]))


def about(part: Polygon, depth: float) -> tuple[float, float]:
    """Return static moment and inertia of an area about a depth (Green's theorem on corners)."""
    inertia = 0.0
    for (x1, y1), (x2, y2) in itertools.pairwise(part.exterior.coords):
        inertia += (x1 * y2 - x2 * y1) * (y1 * y1 + y1 * y2 + y2 * y2) / 12
    area, y = part.area, part.centroid.y
    return area * (depth - y), abs(inertia) - area * y * y + area * (depth - y) ** 2


def expected(x: dict[str, float], *, flange: bool, top: float = 0.0) -> tuple[float, float]:
    """Return neutral axis and inertia; ``top`` is the area of compression bars counted."""
    whole = outline(x, flange=flange)

    def bars(depth: float) -> float:
        tension = x["n_E"] * x["A_s"] * (depth - x["d"])
        return tension + (x["n_E"] - 1) * top * (depth - x["d_p"])

    def unbalanced(depth: float) -> float:
        return about(whole.intersection(box(-1, 0, 1e4, depth)), depth)[0] + bars(depth)

    axis = float(brentq(unbalanced, 1e-3, x["d"], xtol=1e-10))
    inertia = about(whole.intersection(box(-1, 0, 1e4, axis)), axis)[1]
    inertia += x["n_E"] * x["A_s"] * (x["d"] - axis) ** 2
    return axis, inertia + (x["n_E"] - 1) * top * (axis - x["d_p"]) ** 2


@few
@given(x=sections())
def test_width_b(x: dict[str, float]) -> None:
    """A rectangle of width b, without and with compression bars."""
    axis, inertia = expected(x, flange=False)
    x["kd"] = value(deflection.AXIS, x)
    assert x["kd"] == pytest.approx(axis, rel=1e-7)
    assert value(deflection.CRACKED, x) == pytest.approx(inertia, rel=1e-7)
    axis, inertia = expected(x, flange=False, top=x["A_sp"])
    x["kd"] = value(deflection.AXIS_COMPRESSION_BARS, x)
    assert x["kd"] == pytest.approx(axis, rel=1e-7)
    assert value(deflection.CRACKED_COMPRESSION_BARS, x) == pytest.approx(inertia, rel=1e-7)


@few
@given(x=sections())
def test_flange_and_web(x: dict[str, float]) -> None:
    """The axis in the flange if the trial with width b says so, else in the web."""
    axis, inertia = expected(x, flange=True)
    x["kd"] = value(deflection.AXIS, x)
    if x["kd"] <= x["h_f"]:
        assert x["kd"] == pytest.approx(axis, rel=1e-7)
        assert value(deflection.CRACKED, x) == pytest.approx(inertia, rel=1e-7)
        return
    x["kd_w"] = value(deflection.AXIS_IN_WEB, x)
    assert x["kd_w"] >= x["h_f"] * (1 - 1e-9)
    assert x["kd_w"] == pytest.approx(axis, rel=1e-7)
    assert value(deflection.CRACKED_TEE, x) == pytest.approx(inertia, rel=1e-7)
