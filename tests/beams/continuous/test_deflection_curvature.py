"""Curvature along the span against closed forms, an independent integration and its bounds."""

from __future__ import annotations

import numpy as np
import pytest
from scipy.integrate import quad

from lineproof.beams.analysis.model import Load, PointLoad, UniformLoad
from lineproof.beams.continuous import curvature
from lineproof.beams.continuous import deflection as numbers
from lineproof.beams.continuous.deflection_service import Point, service_moments
from lineproof.beams.continuous.deflection_shapes import deflected_shapes

from .deflecting import FLOOR, PARTITIONS, beam_of, section_of
from .deflecting import STIFF as STIFF_SECTION

# E 25000, gross 8e9, web 6e9, cracked 4e9, 3e9, 3.5e9 mm4; cracking at 60 and 50 kN.m.
STIFF = curvature.Stiffness(25e3, 8e9, 6e9, 4e9, 3e9, 3.5e9, 60e6, 50e6)
UNCRACKED = curvature.Stiffness(25e3, 8e9, 8e9, 4e9, 3e9, 3.5e9, 1e12, 1e12)
L = 8000.0


def test_uncracked_span_is_the_beam_of_one_stiffness() -> None:
    """w = 20: 5 w l^4/(384 E I) - (M_1 + M_2) l^2/(16 E I), 100 and 60 kN.m, at midspan."""
    M_1, M_2 = 100e6, 60e6
    M = curvature.span_moments(L, 20 * L**2 / 8 - (M_1 + M_2) / 2, M_1, M_2)
    shape = curvature.integrated(L, curvature.curvatures(M, UNCRACKED))
    exact = (5 * 20 * L**4 / 384 - (M_1 + M_2) * L**2 / 16) / (25e3 * 8e9)

    assert shape.y[curvature.PIECES // 2] == pytest.approx(exact, rel=1e-12)
    assert shape.y[0] == 0
    assert shape.y[-1] == pytest.approx(0, abs=1e-12)


def test_point_load_and_end_moments_give_their_moments() -> None:
    """M at midspan and ends as given, P b x/l from the left of the load besides."""
    M = curvature.span_moments(L, 90e6, 100e6, 60e6, (Point(40e3, 2000),))
    bare = curvature.span_moments(L, 90e6 - 40e3 * 2000 / 2, 100e6, 60e6)
    at = curvature.stations(L)

    assert M[0] == -100e6
    assert M[-1] == pytest.approx(-60e6)
    assert M[len(M) // 2] == pytest.approx(90e6)
    quarter = int(np.searchsorted(at, 2000))
    assert M[quarter] - bare[quarter] == pytest.approx(40e3 * 2000 * 6000 / 8000)


def test_cracked_span_against_an_independent_integration() -> None:
    """Unit load at midspan, scipy's quad over M m/(E I_e), I_e written out here anew."""
    M_1, M_2, M_m = 150e6, 90e6, 110e6

    def kappa(x: float) -> float:
        t = x / L
        M = 4 * (M_m + (M_1 + M_2) / 2) * t * (1 - t) - M_1 * (1 - t) - M_2 * t
        if M >= 0:
            gross, low, crack = 8e9, 4e9, 60e6
        else:
            gross, low, crack = 6e9, (3e9 if t <= 0.5 else 3.5e9), 50e6
        I_e = gross if abs(M) <= crack else low + (gross - low) * (crack / abs(M)) ** 3
        return M / (25e3 * I_e)

    exact, _ = quad(lambda x: kappa(x) * min(x, L - x) / 2, 0, L, limit=500, points=[L / 2])
    M = curvature.span_moments(L, M_m, M_1, M_2)
    shape = curvature.integrated(L, curvature.curvatures(M, STIFF))

    # Simpson over 200 pieces, kinks of I_e inside a piece
    assert shape.y[curvature.PIECES // 2] == pytest.approx(exact, rel=1e-3)


def test_deflection_lies_between_gross_and_cracked() -> None:
    M = curvature.span_moments(L, 160e6, 0, 0)
    y = curvature.integrated(L, curvature.curvatures(M, STIFF)).largest
    gross = 5 * 160e6 * L**2 / (48 * 25e3 * 8e9)

    assert gross < y < 2 * gross


def test_procedures_take_point_loads_as_settings() -> None:
    settings = curvature.settings_of((Point(40e3, 2000.0),))
    simple = curvature.SIMPLE.function(L, 25e3, 8e9, 4e9, 1e12, 80e6, **settings)
    ends = (L, 25e3, 8e9, 8e9, 4e9, 3e9, 1e12, 1e12, 80e6, 50e6)
    left = curvature.LEFT_END.function(*ends)
    right = curvature.RIGHT_END.function(*ends)
    uniform = 80e6 - 40e6
    at_midspan = (5 * uniform * L**2 / 48 + 40e3 * 2000 * (3 * L**2 - 4 * 2000**2) / 48) / 2e14

    # the largest lies beside midspan, at most a few per mille above it
    assert at_midspan < simple < 1.01 * at_midspan
    assert left == pytest.approx(right, rel=1e-12)


def test_shapes_are_those_of_the_stages() -> None:
    """In the end 3.0 sustained + rest, after attachment 1.0 sustained + rest; near the checked."""
    beam = beam_of([7600, 9200, 7600], ["simple"] * 4)
    loads: list[Load] = [
        UniformLoad(kind, k, w) for k in (1, 2, 3) for kind, w in (("D", 22.0), ("L", 15.0))
    ]
    section, service = section_of(beam, 2), service_moments(beam, loads, 2)
    found = numbers.deflections(section, service.stages, carries=PARTITIONS)
    made = deflected_shapes(section, service.stages, found)
    middle = len(made.x) // 2

    # two ways of counting the cracked lengths: within a quarter of each other
    assert made.immediate[middle] == pytest.approx(found.stages["all"].delta, rel=0.25)
    assert made.attached[middle] == pytest.approx(found.attached, rel=0.25)
    assert made.total[middle] == pytest.approx(found.total, rel=0.25)
    # zeta_s: S = 2.0 in the end and 1.0 at three months, no compression bars: 3.0 and 2.0, so
    # total - attached = (3.0 - (3.0 - 2.0)) sustained; sustained alone is what rest leaves over
    sustained = made.immediate - (made.total - 3.0 * (made.total - made.attached) / 2.0)
    assert (made.total - made.attached) / 2.0 == pytest.approx(sustained, abs=1e-9)
    assert made.x[-1] == 9200


@pytest.mark.parametrize("free", ["left", "right"])
def test_cantilever_hangs_from_its_root(free: str) -> None:
    """Uncracked: the tip as by formula, the root at zero, on its own side."""
    lengths, kinds, span = [2500, 7000], ["free", "simple", "simple"], 1
    if free == "right":
        lengths, kinds, span = lengths[::-1], kinds[::-1], 2
    beam = beam_of(lengths, kinds)
    behind = numbers.Behind(7000, dict.fromkeys(("dead", "sustained", "all"), 7.2e9))
    section = section_of(beam, span, behind=behind, **STIFF_SECTION)
    tip = 0.0 if free == "left" else 2500.0
    loads: list[Load] = [UniformLoad("D", span, 40), PointLoad("D", span, 30e3, abs(tip - 500))]
    service = service_moments(beam, loads, span)
    found = numbers.deflections(section, service.stages, carries=FLOOR)
    made = deflected_shapes(section, service.stages, found)
    root, end = (-1, 0) if free == "left" else (0, -1)

    assert made.immediate[root] == 0
    assert made.immediate[end] == pytest.approx(found.stages["all"].delta, rel=1e-6)
