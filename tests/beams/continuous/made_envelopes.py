"""Envelopes made up of simple curves, for the tests of figures along a beam."""

from __future__ import annotations

from lineproof.beams.continuous.figure_deflection import DeflectionCurve, DeflectionPiece
from lineproof.beams.continuous.figure_envelope import (
    RESTRAINED,
    MomentPiece,
    Section,
    ShearPiece,
)
from lineproof.beams.continuous.layout import BeamOutline

STEPS = 40
W = 60.0
"""N/mm over all spans."""


def stations(beam: BeamOutline, span: int) -> list[float]:
    """Return stations from face to face."""
    start, end = beam.faces(span)
    return [start + (end - start) * number / STEPS for number in range(STEPS + 1)]


def end_factors(beam: BeamOutline, span: int) -> tuple[float, float]:
    """Return the moments at both ends as parts of w l^2; none at an outer end, more at a root."""
    factors = []
    for number, other in ((span, span + 1), (span + 1, span)):
        support = beam.supports[number - 1]
        outer = number in (1, len(beam.supports))
        root = beam.supports[other - 1].kind == "free"
        factors.append(0.0 if support.kind == "free" else 0.5 if root else 0.02 if outer else 0.1)
    return factors[0], factors[1]


def moments(beam: BeamOutline) -> list[MomentPiece]:
    """Return parabolas between end moments, the resistance in three steps."""
    pieces = []
    for span, length in enumerate(beam.lengths, start=1):
        left = beam.axes[span - 1]
        xs = stations(beam, span)
        a, b = end_factors(beam, span)
        whole = W * length**2
        high, low = [], []
        for x in xs:
            t = (x - left) / length
            simple = t * (1 - t) / 2
            ends = a * (1 - t) + b * t
            high.append(whole * (simple - 0.7 * ends))
            low.append(whole * (0.5 * simple - ends))
        pos, neg = max(*high, 0.1 * whole), max(-min(low), 0.05 * whole)
        near = [abs((x - left) / length - 0.5) for x in xs]
        pieces.append(
            MomentPiece(
                span,
                xs,
                high,
                low,
                [1.1 * pos * (1.0 if t < 0.3 else 0.6) for t in near],
                [1.15 * neg * (1.0 if t > 0.2 else 0.4) for t in near],
            )
        )
    return pieces


def shears(beam: BeamOutline) -> list[ShearPiece]:
    """Return straight lines, the resistance in zones."""
    pieces = []
    for span, length in enumerate(beam.lengths, start=1):
        left = beam.axes[span - 1]
        xs = stations(beam, span)
        whole = W * length
        free = [beam.supports[n].kind == "free" for n in (span - 1, span)]
        zero = 0.0 if free[0] else 1.0 if free[1] else 0.5
        high = [whole * (zero - (x - left) / length + 0.05) for x in xs]
        low = [whole * (zero - (x - left) / length - 0.05) for x in xs]
        near = [abs((x - left) / length - 0.5) for x in xs]
        pieces.append(
            ShearPiece(span, xs, high, low, [whole * (0.6 if t > 0.28 else 0.4) for t in near])
        )
    return pieces


def moment_sections(beam: BeamOutline) -> list[Section]:
    """Return a section at midspan and at both faces of every span, restraint at the outer ones."""
    found = []
    for piece in moments(beam):
        middle = len(piece.x) // 2
        for index in (0, middle, len(piece.x) - 1):
            outer = piece.x[index] in (beam.faces(1)[0], beam.faces(len(beam.lengths))[1])
            M = piece.M_max[index] if index == middle else piece.M_min[index]
            M_r = piece.M_r_pos[index] if index == middle else piece.M_r_neg[index]
            words = RESTRAINED if outer and index != middle else ""
            found.append(Section(piece.x[index], -0.02 * M_r if words else M, M_r, words))
    return found


def shear_sections(beam: BeamOutline) -> list[Section]:
    """Return sections near both faces, two cases at one of them, and one without resistance."""
    found = []
    for piece in shears(beam):
        near, far = 3, len(piece.x) - 4
        found += [
            Section(piece.x[near], piece.V_max[near], piece.V_r[near]),
            Section(piece.x[near], 0.9 * piece.V_max[near], 1.2 * piece.V_r[near]),
            Section(piece.x[far], piece.V_min[far], None if piece.span == 1 else piece.V_r[far]),
        ]
    return found


def deflections(
    beam: BeamOutline, names: tuple[str, ...] = ("immediate",)
) -> list[DeflectionCurve]:
    """Return half waves, each curve a larger one."""
    curves = []
    for number, name in enumerate(names, start=1):
        pieces = []
        for span, length in enumerate(beam.lengths, start=1):
            xs = stations(beam, span)
            left = beam.axes[span - 1]
            size = number * length / 1500.0
            pieces.append(
                DeflectionPiece(
                    span,
                    xs,
                    [size * 4 * (x - left) / length * (1 - (x - left) / length) for x in xs],
                )
            )
        curves.append(DeflectionCurve(name, pieces))
    return curves
