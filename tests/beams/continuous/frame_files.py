"""Files as an office's frame analysis would write them, for the tests of imported forces.

Our own solution is written at even stations, faces left out, numbers rounded to so many decimals of
kN, m and kN.m; at a point load the station stands twice.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from pathlib import Path

import numpy as np

from lineproof.beams.analysis.arrangements import LoadCase
from lineproof.beams.analysis.curves import Side
from lineproof.beams.continuous.forces import Forces

HEADER = "span,station (m),case,combination,M (kN.m),V (kN),T (kN.m)"
REACTIONS = "support,case,combination,R (kN)"
NEAR = 0.01
"""Distance below which two stations are one in a file that is written to the thousandth [mm]."""
Torsion = Callable[[int, float], float]


def no_torsion(span: int, x: float) -> float:  # noqa: ARG001 - a torsion by span and place
    """Return no torsion anywhere."""
    return 0.0


def names(case: LoadCase) -> str:
    """Return case and combination as two cells."""
    return f"{case.arrangement.replace(',', ' and') or 'all'},{case.combination}"


def stations_of(forces: Forces, span: int, pieces: int) -> list[float]:
    """Return even stations of a span on whole mm, and those where its load changes."""
    curves = forces.solved.solution.span(span)
    even = np.round(np.linspace(0.0, curves.length, pieces + 1))
    apart = np.abs(even[:, None] - curves.breaks).min(axis=1) > NEAR
    return sorted({*even[apart].tolist(), *curves.breaks.tolist()})


def rows_of(
    forces: Forces, *, pieces: int = 20, decimals: int = 6, torsion: Torsion = no_torsion
) -> list[str]:
    """Return the lines of a file of forces under the header."""
    made = []
    places = [
        (span, x, side)
        for span in range(1, len(forces.beam.spans) + 1)
        for x in stations_of(forces, span, pieces)
        for side in sides_of(forces, span, x)
    ]
    pairs = [forces.pairs(*place) for place in places]
    for row, case in enumerate(forces.cases):
        for (span, x, _), (M, V) in zip(places, pairs, strict=True):
            numbers = round(float(M[row]) / 1e6, decimals), round(float(V[row]) / 1e3, decimals)
            texts = ",".join(repr(number) for number in (*numbers, torsion(span, x)))
            made.append(f"{span},{x / 1000:.6f},{names(case)},{texts}")
    return made


def sides_of(forces: Forces, span: int, x: float) -> tuple[Side, ...]:
    """Return the sides on which a station is written: both where the shear of a case jumps."""
    curves = forces.solved.solution.span(span)
    if x in (0.0, curves.length):
        return ("left",) if x else ("right",)
    jumps = curves.P[:, np.abs(curves.breaks - x) < 1e-6].any()
    return ("left", "right") if jumps else ("right",)


def reaction_rows(forces: Forces, *, decimals: int = 3) -> list[str]:
    """Return the lines of a file of reactions under the header."""
    R = forces.solved.solution.reactions
    return [
        f"{support},{names(case)},{round(float(R[row, support - 1]) / 1e3, decimals)!r}"
        for row, case in enumerate(forces.cases)
        for support in range(1, len(forces.beam.supports) + 1)
    ]


def write(path: Path, lines: Sequence[str], header: str = HEADER) -> str:
    """Write a file; return its path as an input."""
    path.write_text("\n".join([header, *lines]) + "\n", encoding="utf-8")
    return str(path)
