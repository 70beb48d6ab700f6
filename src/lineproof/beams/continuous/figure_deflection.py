"""Deflected shape of a beam, the largest deflection of each span marked [mm]."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from lineproof.beams.continuous.figure_along import Along, Curve, Mark, along_figure
from lineproof.beams.continuous.layout import BeamOutline
from lineproof.drawing import Dash, Figure, Runs
from lineproof.quantity.digits import fixed

DASHES: tuple[Dash, ...] = ("solid", "long", "dotted", "chain")


@dataclass(frozen=True, slots=True)
class DeflectionPiece:
    """Deflections ``w`` of one span at stations ``x`` along the beam, downward positive [mm]."""

    span: int
    x: Sequence[float]
    w: Sequence[float]


@dataclass(frozen=True, slots=True)
class DeflectionCurve:
    """One deflected shape: its name (``immediate, live load``) and a piece a span."""

    name: str
    pieces: Sequence[DeflectionPiece]


def deflection_figure(
    outline: BeamOutline,
    curves: Sequence[DeflectionCurve],
    caption: str = "Deflections",
    notes: Sequence[str] = (),
) -> Figure:
    """Draw up to four deflected shapes, each with the largest value of each span.

    At the place of the largest value of the last curve the values of all curves are printed, in
    the order of their names. ``notes`` say what the values are.
    """
    if not 1 <= len(curves) <= len(DASHES):
        msg = f"{len(curves)} deflected shapes; one figure shows 1 to {len(DASHES)}"
        raise ValueError(msg)
    spans = tuple(piece.span for piece in curves[-1].pieces)
    drawn = tuple(
        Curve(
            f"({_letter(number)}) {curve.name}",
            [list(zip(piece.x, piece.w, strict=True)) for piece in curve.pieces],
            dash,
        )
        for number, (curve, dash) in enumerate(zip(curves, DASHES, strict=False))
    )
    marks = tuple(_mark(curves, index) for index in range(len(spans)))
    note = "Deflections not to the scale of the beam; the largest of each span, downward positive."
    return along_figure(
        outline,
        Along(
            spans=spans,
            curves=drawn,
            above=(),
            below=marks,
            label=(("deflection, mm", "roman"),),
            unit="mm",
            downward=True,
            notes=(" ".join((note, *_coincident(curves))), *notes),
            height=42.0,
        ),
        caption,
    )


def _letter(number: int) -> str:
    return "abcd"[number]


def _mark(curves: Sequence[DeflectionCurve], index: int) -> Mark:
    """Largest value of each curve in a span, at the place of the largest of the last curve."""
    lines: list[Runs] = []
    place = value = 0.0
    for number, curve in enumerate(curves):
        piece = curve.pieces[index]
        most = max(range(len(piece.x)), key=lambda i: abs(piece.w[i]))
        place, value = piece.x[most], piece.w[most]
        name = f"({_letter(number)}) " if len(curves) > 1 else ""
        lines.append(((f"{name}{fixed(value, 1)}", "roman"),))
    return Mark(place, value, tuple(lines))


def _coincident(curves: Sequence[DeflectionCurve]) -> Iterator[str]:
    """Say which curves lie on the one before, where a line of the legend cannot be seen."""
    for number, (before, curve) in enumerate(pairwise(curves), start=1):
        pairs = zip(before.pieces, curve.pieces, strict=True)
        if all(np.allclose(a.w, b.w, rtol=1e-3, atol=1e-3) for a, b in pairs):
            yield f"({_letter(number)}) coincides with ({_letter(number - 1)})."
