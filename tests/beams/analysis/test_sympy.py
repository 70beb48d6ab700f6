"""The frame solution equal to sympy's Beam on beams drawn at random, sympy's numbers exact."""

from __future__ import annotations

import random
from dataclasses import dataclass, replace

import numpy as np
import pytest
import sympy
from sympy.physics.continuum_mechanics.beam import Beam as SympyBeam

from lineproof.beams.analysis.model import (
    FIXED,
    FREE,
    SIMPLE,
    Beam,
    Load,
    PartialLoad,
    PointLoad,
    Span,
    UniformLoad,
)
from lineproof.beams.analysis.solve import solve

EXACT = 1e-9

SEEDS = range(12)


@dataclass(frozen=True)
class Drawn:
    beam: Beam
    loads: list[Load]


def drawn(seed: int) -> Drawn:
    """Return a beam of one EI, of whole millimetres and newtons, so that sympy stays exact."""
    pick = random.Random(seed)  # noqa: S311 - repeatable, not secret
    count = pick.randint(1, 4)
    ends = [pick.choice([SIMPLE, FIXED]), pick.choice([SIMPLE, FIXED])]
    if count > 1 and pick.random() < 0.5:
        ends[pick.randint(0, 1)] = FREE
    EI = pick.randint(2, 20) * 10**13
    beam = Beam(
        tuple(Span(pick.randint(20, 95) * 100, EI) for _ in range(count)),
        (ends[0], *(SIMPLE,) * (count - 1), ends[1]),
    )
    if [s.kind for s in beam.supports].count("simple") == 1 and FIXED not in ends:
        beam = replace(beam, supports=tuple(FIXED if s == SIMPLE else s for s in beam.supports))
    loads: list[Load] = [UniformLoad("D", n, pick.randint(5, 40)) for n in range(1, count + 1)]
    for _ in range(3):
        number = pick.randint(1, count)
        a, b = sorted(pick.sample(range(1, 20), 2))
        part = int(beam.spans[number - 1].length) // 20
        loads.append(PointLoad("L", number, pick.randint(-20, 90) * 1000, a * part))
        loads.append(PartialLoad("S", number, pick.randint(3, 30), a * part, b * part))
    return Drawn(beam, loads)


def by_sympy(case: Drawn) -> SympyBeam:
    """Return sympy's solution of the same beam: loads downward positive, so M sags positive."""
    axes = [sympy.Integer(int(x)) for x in case.beam.axes]
    model = SympyBeam(axes[-1], sympy.Integer(int(case.beam.spans[0].EI)), 1)
    unknown = []
    deflection, slope = [], []
    for number, (x, support) in enumerate(zip(axes, case.beam.supports, strict=True)):
        if support.kind == "free":
            continue
        unknown.append(sympy.Symbol(f"R{number}"))
        model.apply_load(unknown[-1], x, -1)
        deflection.append((x, 0))
        if support.kind == "fixed":
            unknown.append(sympy.Symbol(f"Q{number}"))
            model.apply_load(unknown[-1], x, -2)
            slope.append((x, 0))
    for load in case.loads:
        start = axes[load.span - 1]
        if isinstance(load, PointLoad):
            model.apply_load(int(load.P), start + int(load.at), -1)
        elif isinstance(load, PartialLoad):
            model.apply_load(int(load.w), start + int(load.start), 0, end=start + int(load.end))
        else:
            model.apply_load(int(load.w), start, 0, end=axes[load.span])
    model.bc_deflection, model.bc_slope = deflection, slope
    model.solve_for_reaction_loads(*unknown)
    return model


@pytest.mark.parametrize("seed", SEEDS)
def test_equal_to_sympy(seed: int) -> None:
    case = drawn(seed)
    model, solved = by_sympy(case), solve(case.beam, case.loads).total()
    x = model.variable
    curves_of = {
        "shear": model.shear_force(),
        "moment": model.bending_moment(),
        "deflection": model.deflection(),
    }
    fractions = (0.0315, 0.253, 0.4987, 0.777, 0.9713)
    for what, expression in curves_of.items():
        ours, theirs = [], []
        for number, (start, span) in enumerate(
            zip(case.beam.axes, case.beam.spans, strict=False), start=1
        ):
            stations = [round(f * span.length) + 0.5 for f in fractions]
            ours += getattr(solved.span(number), what)(np.array(stations))[0].tolist()
            theirs += [
                float(expression.subs(x, sympy.Rational(int(2 * (start + s)), 2))) for s in stations
            ]
        largest = max(abs(value) for value in theirs)
        assert ours == pytest.approx(theirs, rel=EXACT, abs=EXACT * largest), what


@pytest.mark.parametrize("seed", SEEDS)
def test_reactions_equal_to_sympy(seed: int) -> None:
    case = drawn(seed)
    model, solved = by_sympy(case), solve(case.beam, case.loads).total()
    for symbol, value in model.reaction_loads.items():
        number = int(symbol.name[1:])
        if symbol.name.startswith("R"):
            # sympy's reactions act with the loads: upward is negative.
            assert solved.reactions[0, number] == pytest.approx(-float(value), rel=EXACT)
        else:
            assert abs(solved.couples[0, number]) == pytest.approx(abs(float(value)), rel=EXACT)
