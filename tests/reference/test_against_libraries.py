"""Closed forms and strain compatibility against shapely (areas) and scipy (roots, integrals)."""

from __future__ import annotations

import itertools
from collections.abc import Callable
from dataclasses import dataclass

import pytest
from hypothesis import assume, example, given, settings
from hypothesis import strategies as st
from scipy.integrate import quad
from scipy.optimize import brentq
from shapely.geometry import Polygon, box

from lineproof.standards.a23_3 import flange, flexure, strain

from .calculator import value

few = settings(max_examples=150, deadline=None, derandomize=True, database=None)
E_S, EPS_CU, PHI_C, PHI_S = 200000.0, 0.0035, 0.65, 0.85


@dataclass(frozen=True)
class Concrete:
    """A section with compression at the top: T, L or rectangle (then b == b_w)."""

    kind: str
    b: float
    b_w: float
    h: float
    h_f: float
    f_c: float

    @property
    def outline(self) -> Polygon:
        """The gross section; y up from the bottom face."""
        web = box(0, 0, self.b_w, self.h)
        left = (self.b - self.b_w) / 2 if self.kind == "T" else 0.0
        slab = box(-left, self.h - self.h_f, self.b - left, self.h)
        return web.union(slab)

    @property
    def stress(self) -> float:
        """Stress of the block [MPa]: (0.85 - 0.0015 f'c) 0.65 f'c."""
        return (0.85 - 0.0015 * self.f_c) * PHI_C * self.f_c

    @property
    def beta_1(self) -> float:
        """Depth of the block over c."""
        return 0.97 - 0.0025 * self.f_c

    def width(self, depth: float) -> float:
        """Width at a depth below the top."""
        return self.b if depth < self.h_f else self.b_w

    @property
    def given(self) -> dict[str, float]:
        """Arguments by name."""
        return {
            "b": self.b, "b_f": self.b, "b_w": self.b_w, "h": self.h, "h_f": self.h_f,
            "f_c": self.f_c, "alpha_1": 0.85 - 0.0015 * self.f_c, "beta_1": self.beta_1,
            "phi_c": PHI_C, "phi_s": PHI_S,
        }  # fmt: skip


@st.composite
def sections(draw: st.DrawFn) -> Concrete:
    """Draw sizes of building beams."""
    kind = draw(st.sampled_from(["T", "L", "rectangular"]))
    b_w = float(draw(st.integers(200, 600)))
    h = float(draw(st.integers(300, 1200)))
    f_c = float(draw(st.integers(20, 80)))
    if kind == "rectangular":
        return Concrete(kind, b_w, b_w, h, h, f_c)
    b = b_w + draw(st.integers(50, 2500))
    return Concrete(kind, b, b_w, h, float(draw(st.integers(60, 200))), f_c)


def moments_of_area(outline: Polygon) -> tuple[float, float, float]:
    """Return area, height of the centroid and inertia about it (Green's theorem on the corners)."""
    inertia = 0.0
    corners = list(outline.exterior.coords)
    for (x1, y1), (x2, y2) in itertools.pairwise(corners):
        inertia += (x1 * y2 - x2 * y1) * (y1 * y1 + y1 * y2 + y2 * y2) / 12
    area, y = outline.area, outline.centroid.y
    return area, y, abs(inertia) - area * y * y


@few
@given(section=sections())
def test_gross_properties(section: Concrete) -> None:
    """Area and centroid by shapely, inertia from its corners."""
    area, y, inertia = moments_of_area(section.outline)
    x = section.given
    tee = section.kind != "rectangular"
    assert value(flange.AREA_TEE if tee else flange.AREA_RECTANGLE, x) == pytest.approx(area)
    x["A_g"] = area
    assert value(flange.CENTROID_TEE if tee else flange.CENTROID_RECTANGLE, x) == pytest.approx(y)
    x["y_b"] = y
    made = value(flange.INERTIA_TEE if tee else flange.INERTIA_RECTANGLE, x)
    assert made == pytest.approx(inertia, rel=1e-7)


@few
@given(section=sections(), share=st.floats(0.05, 0.95), f_y=st.sampled_from([400.0, 500.0]))
def test_compression_zone(section: Concrete, share: float, f_y: float) -> None:
    """The zone cut out by shapely balances the bars, and its centroid is where C acts."""
    x = section.given | {"f_y": f_y, "d": 0.9 * section.h}
    x["A_s"] = share * 0.5 * section.stress * section.outline.area / (PHI_S * f_y)
    a, M_r = closed_form(x, in_web=section.kind != "rectangular")
    assume(a < 0.9 * x["d"])
    top = box(-1e4, section.h - a, 1e4, section.h)
    zone = section.outline.intersection(top)
    tension = PHI_S * x["A_s"] * f_y
    assert section.stress * zone.area == pytest.approx(tension, rel=1e-9)
    depth = section.h - zone.centroid.y
    assert pytest.approx(tension * (x["d"] - depth), rel=1e-9) == M_r


def closed_form(x: dict[str, float], *, in_web: bool) -> tuple[float, float]:
    """Return depth of the block and M_r by the catalogue's formulas, flange or web."""
    x["a"] = value(flexure.BLOCK_RECTANGULAR, x)
    if x["a"] <= x["h_f"] or not in_web:
        return x["a"], value(flexure.M_R_RECTANGULAR, x)
    x["C_f"] = value(flexure.FLANGE_FORCE, x)
    x["a_w"] = value(flexure.BLOCK_IN_WEB, x)
    return x["a_w"], value(flexure.M_R_TEE, x)


def root(unbalanced: Callable[[float], float], most: float) -> float:
    """Return the neutral axis by scipy."""
    return float(brentq(unbalanced, 1e-2, most, xtol=1e-10, rtol=1e-14))


def bar_force(depth: float, area: float, f_y: float, c: float) -> float:
    """Return the force of elastic, perfectly plastic bars at their strain, tension positive."""
    stress = E_S * EPS_CU * (depth - c) / c
    return PHI_S * area * max(-f_y, min(f_y, stress))


@few
@given(
    section=sections(),
    areas=st.tuples(st.floats(200, 6000), st.floats(200, 6000)),
    f_y=st.sampled_from([400.0, 500.0]),
)
@example(Concrete("T", 250.0, 200.0, 300.0, 60.0, 20.0), (5199.0, 4338.0), 400.0)
def test_neutral_axis_of_the_block(
    section: Concrete, areas: tuple[float, float], f_y: float
) -> None:
    """Two layers, yielding or not: the package's root against brentq on shapely areas.

    With the relief of the upper layer forces balance a second time just below it in the example.
    """
    depths = (0.92 * section.h, 0.8 * section.h)

    def unbalanced(c: float) -> float:
        cut = box(-1e4, section.h - section.beta_1 * c, 1e4, section.h)
        concrete = section.stress * section.outline.intersection(cut).area
        bars = [bar_force(d, A, f_y, c) for d, A in zip(depths, areas, strict=True)]
        return float(concrete) - sum(bars)

    expected = root(unbalanced, 2 * section.h)
    layers = [strain.Layer(d, A) for d, A in zip(depths, areas, strict=True)]
    made = strain.neutral_axis(
        strain.block_strips(_of(section), section.stress, section.beta_1),
        layers, strain.Steel(E_S, f_y, PHI_S), EPS_CU, section.stress,
    )  # fmt: skip
    # Above the layers nothing is displaced; below the upper layer the relief counts.
    assume(expected < 0.8 * section.h)
    assert made == pytest.approx(expected, rel=1e-6)
    if bar_force(depths[1], areas[1], f_y, expected) == PHI_S * areas[1] * f_y:
        x = section.given | {"f_y": f_y, "A_s": sum(areas), "d": 0.9 * section.h}
        a, _ = closed_form(x, in_web=section.kind != "rectangular")
        assert a / section.beta_1 == pytest.approx(expected, rel=1e-6)


@few
@given(section=sections(), area=st.floats(300, 4000))
def test_neutral_axis_of_the_parabola(section: Concrete, area: float) -> None:
    """The parabolic curve integrated by scipy's quad, its root by brentq; strips within 0.01 %."""
    d, peak = 0.9 * section.h, 0.9 * PHI_C * section.f_c

    def stress(depth: float, c: float) -> float:
        share = min(EPS_CU * (1 - depth / c) / 0.002, 1.0)
        return peak * (2 * share - share * share) * section.width(depth)

    def concrete(c: float) -> float:
        corners = sorted({0.0, min(section.h_f, c), c * (1 - 0.002 / EPS_CU), c})
        pieces = itertools.pairwise(corners)
        return sum(float(quad(stress, low, high, args=(c,))[0]) for low, high in pieces)

    expected = root(lambda c: concrete(c) - bar_force(d, area, 400.0, c), 1.2 * section.h)
    strips = strain.parabola_strips(_of(section), peak, 0.002, EPS_CU)
    steel = strain.Steel(E_S, 400.0, PHI_S)
    made = strain.neutral_axis(strips, [strain.Layer(d, area)], steel, EPS_CU)
    assert made == pytest.approx(expected, rel=1e-4)


def _of(section: Concrete) -> strain.Section:
    return strain.Section(section.b, section.b_w, section.h_f)
