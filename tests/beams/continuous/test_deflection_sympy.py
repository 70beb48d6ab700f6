"""Deflections of uncracked beams equal to sympy's, which is exact."""

from __future__ import annotations

from dataclasses import replace

import pytest
import sympy
from sympy.physics.continuum_mechanics.beam import Beam as SympyBeam

from lineproof.beams.analysis.model import Beam, Load, PartialLoad, PointLoad, Span, UniformLoad
from lineproof.beams.continuous import deflection as numbers
from lineproof.beams.continuous.deflection_service import STAGES, service_moments

from .deflecting import FLOOR, STIFF, beam_of, section_of

EXACT = 1e-9
LOADS: tuple[Load, ...] = (
    UniformLoad("D", 1, 20), UniformLoad("D", 2, 25), PointLoad("D", 1, 60e3, 2000),
    PartialLoad("D", 1, 12, 1000, 5000), PointLoad("D", 2, 30e3, 7000),
)  # fmt: skip


def by_sympy(lengths: list[int], supports: list[int], loads: tuple[Load, ...]) -> SympyBeam:
    """Return sympy's beam of one EI, held at some axes; deflections downward."""
    E, I = sympy.Integer(20000), sympy.Integer(7_200_000_000)
    axes = [sum(lengths[:i]) for i in range(len(lengths) + 1)]
    model = SympyBeam(axes[-1], E, I)
    unknown = [sympy.Symbol(f"R{i}") for i in supports]
    for symbol, i in zip(unknown, supports, strict=True):
        model.apply_load(symbol, axes[i], -1)
        model.bc_deflection.append((axes[i], 0))
    for load in loads:
        at = axes[load.span - 1]
        if isinstance(load, PointLoad):
            model.apply_load(int(load.P), at + int(load.at), -1)
            continue
        start, end = (
            (load.start, load.end) if isinstance(load, PartialLoad) else (0, lengths[load.span - 1])
        )
        model.apply_load(int(load.w), at + int(start), 0, end=at + int(end))
    model.solve_for_reaction_loads(*unknown)
    return model


def elastic(lengths: list[int], supports: list[str]) -> tuple[Beam, dict[str, float]]:
    """Return a beam of E 20000 MPa and I 7.2e9 mm4, and the section that goes with it."""
    drawn = beam_of(lengths, supports)
    spans = tuple(Span.of(length, 20000, 7.2e9) for length in lengths)
    return Beam(spans, drawn.supports), STIFF | {"E_c": 20000.0}


@pytest.mark.parametrize("span", [1, 2])
def test_uncracked_continuous_span_equals_sympy(span: int) -> None:
    """Midspan of two spans of one EI under uniform, partial and point loads, to 1e-9."""
    beam, stiff = elastic([8000, 9000], ["simple", "simple", "simple"])
    found = numbers.deflections(
        section_of(beam, span, **stiff), service_moments(beam, LOADS, span).stages, carries=FLOOR
    )
    curve = by_sympy([8000, 9000], [0, 1, 2], LOADS).deflection()
    exact = float(curve.subs(sympy.Symbol("x"), [4000, 12500][span - 1]))

    assert abs(exact) > 1
    assert found.stages["all"].delta == pytest.approx(exact, rel=EXACT)


@pytest.mark.parametrize("free", ["left", "right"])
def test_uncracked_cantilever_equals_sympy(free: str) -> None:
    """The tip sinks by its own bending and by the rotation of the root; mirrored the same."""
    own: tuple[Load, ...] = (
        UniformLoad("D", 1, 40), PointLoad("D", 1, 30e3, 500), PartialLoad("D", 1, 10, 0, 1000),
        UniformLoad("D", 2, 11), PointLoad("D", 2, 20e3, 2000),
        PartialLoad("D", 2, 6, 1000, 5000),
    )  # fmt: skip
    model = by_sympy([2500, 7000], [1, 2], own)
    exact = float(model.deflection().subs(sympy.Symbol("x"), 0))
    lengths, kinds, number = [2500, 7000], ["free", "simple", "simple"], 1
    if free == "right":
        lengths, kinds, number = lengths[::-1], kinds[::-1], 2
        own = tuple(mirrored(load, lengths) for load in own)
    beam, stiff = elastic(lengths, kinds)
    behind = numbers.Behind(7000, dict.fromkeys(STAGES, 7.2e9))
    found = numbers.deflections(
        section_of(beam, number, behind=behind, **stiff),
        service_moments(beam, own, number).stages,
        carries=FLOOR,
    )

    assert abs(exact) > 1
    assert found.stages["all"].delta == pytest.approx(exact, rel=EXACT)
    assert found.stages["all"].theta_r != 0


def mirrored(load: Load, lengths: list[int]) -> Load:
    """Return a load of the beam seen from behind; lengths are those of the mirrored beam."""
    span = len(lengths) + 1 - load.span
    length = lengths[span - 1]
    if isinstance(load, PointLoad):
        return replace(load, span=span, at=length - load.at)
    if isinstance(load, PartialLoad):
        return replace(load, span=span, start=length - load.end, end=length - load.start)
    return replace(load, span=span)


def test_cantilever_fixed_at_its_root() -> None:
    """w l^4/(8 E I) and P l^3/(3 E I)."""
    beam, stiff = elastic([2000], ["fixed", "free"])
    loads: list[Load] = [UniformLoad("D", 1, 30), PointLoad("D", 1, 40e3, 2000)]
    found = numbers.deflections(
        section_of(beam, 1, **stiff), service_moments(beam, loads, 1).stages, carries=FLOOR
    )
    exact = (30 * 2000**4 / 8 + 40e3 * 2000**3 / 3) / (20000 * 7.2e9)

    assert found.stages["all"].delta == pytest.approx(exact, rel=EXACT)


def test_rise_of_an_uncracked_short_span_equals_sympy() -> None:
    """Spans 9, 2.4, 9 m: live load on the outer ones lifts midspan of the short one."""
    lengths = [9000, 2400, 9000]
    beam, stiff = elastic(lengths, ["simple"] * 4)
    dead: tuple[Load, ...] = tuple(UniformLoad("D", k, 22) for k in (1, 2, 3))
    live: tuple[Load, ...] = tuple(UniformLoad("L", k, 15) for k in (1, 2, 3))
    service = service_moments(beam, (*dead, *live), 2)
    found = numbers.deflections(section_of(beam, 2, **stiff), service.stages, carries=FLOOR)
    lifted = (*dead, live[0], live[2])
    exact, only_dead = (
        float(by_sympy(lengths, [0, 1, 2, 3], loads).deflection().subs(sympy.Symbol("x"), 10200))
        for loads in (lifted, dead)
    )

    assert service.lifting == "live load on spans 1, 3"
    assert service.arrangement == "live load on span 2"
    assert found.stages["rise"].delta == pytest.approx(exact, rel=EXACT)
    assert found.rise == pytest.approx(only_dead - exact, rel=1e-8)
