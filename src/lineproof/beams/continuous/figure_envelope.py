"""Envelopes of moment and shear along a beam with the resistance of what is detailed [N, mm].

Moments are drawn on the side in tension: positive moments below the axis.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from lineproof.beams.continuous.figure_along import Along, Curve, Mark, along_figure
from lineproof.beams.continuous.layout import BeamOutline
from lineproof.drawing import Figure, Runs, symbol, words
from lineproof.quantity.digits import MINUS
from lineproof.record.printing import in_unit

KNM, KN = 1e-6, 1e-3
OFF = 0.5
"""A shear is off the curve by more than what is printed [kN]."""
DIGITS = 3
"""Values print as in the tables of the summary."""
SIDE = "Moments are drawn on the side in tension: positive moments below the axis."
RESTRAINED = "restraint"
RESTRAINT = (
    "Restraint: assumed at an end that is analysed as free to rotate; the curves of the load cases "
    "leave it out."
)
INSIDE = "A dot inside the curves is of a further load case, with the resistance that it has."


@dataclass(frozen=True, slots=True)
class MomentPiece:
    """Moments of one span at stations ``x`` along the beam [mm]; resistances as magnitudes.

    ``M_max`` and ``M_min`` are the largest and smallest over all cases, positive where the
    bottom is in tension [N.mm]. Bars must carry within ``asked``, along the beam [mm]; without,
    from face to face.
    """

    span: int
    x: Sequence[float]
    M_max: Sequence[float]
    M_min: Sequence[float]
    M_r_pos: Sequence[float]
    M_r_neg: Sequence[float]
    asked: tuple[float, float] | None = None


@dataclass(frozen=True, slots=True)
class ShearPiece:
    """Shears of one span at stations ``x`` along the beam [mm]; ``V_r`` is a magnitude [N]."""

    span: int
    x: Sequence[float]
    V_max: Sequence[float]
    V_min: Sequence[float]
    V_r: Sequence[float]


@dataclass(frozen=True, slots=True)
class Section:
    """A section of the working at ``x`` along the beam [mm], with the values of its lines.

    ``demand`` is a moment, positive with the bottom in tension [N.mm], or a shear [N];
    ``resistance`` a magnitude, None where the method gives none. ``words`` tell a moment that no
    load case has. ``shown`` are both as the tables print them; without, they print to three digits.
    """

    x: float
    demand: float
    resistance: float | None
    words: str = ""
    shown: tuple[str, str] | None = None


def moment_figure(
    outline: BeamOutline, pieces: Sequence[MomentPiece], sections: Sequence[Section] = ()
) -> Figure:
    """Draw the moment envelope with the resistance; the values of ``sections``, faces marked."""
    demand = [_scaled(p.x, p.M_max, KNM) for p in pieces]
    demand += [_scaled(p.x, p.M_min, KNM) for p in pieces]
    resistance = [_scaled(p.x, p.M_r_pos, KNM) for p in pieces]
    resistance += [_scaled(p.x, [-abs(m) for m in p.M_r_neg], KNM) for p in pieces]
    marks = _marks(sections, outline, [p.span for p in pieces], "M", "kN.m")
    restrained = any(RESTRAINED in map(_plain, mark.lines) for mark in marks)
    return along_figure(
        outline,
        Along(
            spans=tuple(p.span for p in pieces),
            curves=(
                Curve("largest and smallest factored moment of all cases", demand, "solid"),
                Curve("resistance of the bars as detailed", resistance, "long"),
            ),
            above=tuple(mark for mark in marks if mark.y < 0.0),
            below=tuple(mark for mark in marks if mark.y >= 0.0),
            label=(*symbol("M"), (", kN·m", "roman")),
            unit="kN·m",
            downward=True,
            notes=(SIDE, RESTRAINT) if restrained else (SIDE,),
            exceeded=tuple(
                stretch
                for p in pieces
                for stretch in _exceeded(
                    p.x,
                    [
                        high > abs(pos) or -low > abs(neg)
                        for high, low, pos, neg in zip(
                            p.M_max, p.M_min, p.M_r_pos, p.M_r_neg, strict=True
                        )
                    ],
                    p.asked or outline.faces(p.span),
                )
            ),
        ),
        "Moment envelope and resistance of the bars as detailed",
    )


def _scaled(x: Sequence[float], y: Sequence[float], factor: float) -> list[tuple[float, float]]:
    return [(a, factor * b) for a, b in zip(x, y, strict=True)]


def _value(name: str, sub: str, value: float, unit: str, shown: str = "") -> Runs:
    sign = MINUS if value < 0.0 else ""
    text = shown or in_unit(abs(value), unit, DIGITS)
    return (*symbol(name, sub), (f" = {sign}{text}", "roman"))


def _marks(
    sections: Sequence[Section], outline: BeamOutline, spans: Sequence[int], name: str, unit: str
) -> list[Mark]:
    """Return a mark a section of the spans shown; what would be said twice at a place once."""
    low, high = outline.axes[min(spans) - 1], outline.axes[max(spans)]
    factor = KNM if unit == "kN.m" else KN
    marks: list[Mark] = []
    for section in sections:
        if not low <= section.x <= high:
            continue
        shown = section.shown or ("", "")
        lines = [_value(name, "f", section.demand, unit, shown[0])]
        if section.resistance is None:
            lines.append((("no ", "roman"), *symbol(name, "r")))
        else:
            resistance = math.copysign(section.resistance, section.demand)
            lines.append(_value(name, "r", resistance, unit, shown[1]))
        if section.words:
            lines.append(words(section.words))
        mark = Mark(section.x, factor * section.demand, tuple(lines))
        if not any(mark.x == other.x and mark.lines == other.lines for other in marks):
            marks.append(mark)
    return marks


def _plain(line: Runs) -> str:
    return "".join(text for text, _ in line)


def _inside(pieces: Sequence[ShearPiece], marks: Sequence[Mark]) -> bool:
    """Tell whether a mark lies nearer zero than the curve: its case is not the largest there."""
    for mark in marks:
        piece = next(p for p in pieces if p.x[0] <= mark.x <= p.x[-1])
        largest = np.interp(mark.x, piece.x, piece.V_max if mark.y > 0.0 else piece.V_min)
        if abs(mark.y) < KN * abs(largest) - OFF:
            return True
    return False


def shear_figure(
    outline: BeamOutline,
    pieces: Sequence[ShearPiece],
    sections: Sequence[Section] = (),
    critical: Sequence[float] = (),
) -> Figure:
    """Draw the shear envelope with the resistance of the zones, both signs.

    The values of ``sections`` [N] are printed at their places. Only between the ``critical``
    sections of a span [mm] is a shear over the resistance marked: nearer the supports the shear
    of the critical section holds.
    """
    demand = [_scaled(p.x, p.V_max, KN) for p in pieces]
    demand += [_scaled(p.x, p.V_min, KN) for p in pieces]
    resistance = [_scaled(p.x, p.V_r, KN) for p in pieces]
    resistance += [_scaled(p.x, [-v for v in p.V_r], KN) for p in pieces]
    marks = _marks(sections, outline, [p.span for p in pieces], "V", "kN")
    exceeded: list[tuple[float, float]] = []
    for piece in pieces:
        start, end = outline.faces(piece.span)
        inside = [x for x in critical if start <= x <= end]
        if inside:
            over = [
                max(high, -low) > V_r
                for high, low, V_r in zip(piece.V_max, piece.V_min, piece.V_r, strict=True)
            ]
            exceeded += _exceeded(piece.x, over, (min(inside), max(inside)))
    return along_figure(
        outline,
        Along(
            spans=tuple(p.span for p in pieces),
            curves=(
                Curve("largest and smallest factored shear of all cases", demand, "solid"),
                Curve("resistance of web and stirrups", resistance, "long"),
            ),
            above=tuple(mark for mark in marks if mark.y >= 0.0),
            below=tuple(mark for mark in marks if mark.y < 0.0),
            label=(*symbol("V"), (", kN", "roman")),
            unit="kN",
            notes=(INSIDE,) if _inside(pieces, marks) else (),
            exceeded=tuple(exceeded),
        ),
        "Shear envelope and resistance of the stirrup zones",
    )


def _exceeded(
    x: Sequence[float], over: Sequence[bool], within: tuple[float, float]
) -> list[tuple[float, float]]:
    """Return stretches of stations that are over, each reaching to its neighbours."""
    found: list[tuple[float, float]] = []
    for index, bad in enumerate(over):
        if not bad or not within[0] - 1e-6 <= x[index] <= within[1] + 1e-6:
            continue
        low = max(x[max(index - 1, 0)], within[0])
        high = min(x[min(index + 1, len(x) - 1)], within[1])
        if found and low <= found[-1][1]:
            found[-1] = (found[-1][0], high)
        else:
            found.append((low, high))
    return found
