"""Envelopes of moment and shear along a beam with the resistance of what is detailed [N, mm].

Moments are drawn on the side in tension: positive moments below the axis.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from types import MappingProxyType

from lineproof.beams.continuous.figure_along import Along, Curve, Mark, along_figure
from lineproof.beams.continuous.layout import BeamOutline
from lineproof.drawing import Figure, Runs, symbol
from lineproof.quantity.digits import fixed

KNM, KN = 1e-6, 1e-3


@dataclass(frozen=True, slots=True)
class MomentPiece:
    """Moments of one span at stations ``x`` along the beam [mm]; resistances as magnitudes.

    ``M_max`` and ``M_min`` are the largest and smallest over all cases, positive where the
    bottom is in tension [N.mm].
    """

    span: int
    x: Sequence[float]
    M_max: Sequence[float]
    M_min: Sequence[float]
    M_r_pos: Sequence[float]
    M_r_neg: Sequence[float]


@dataclass(frozen=True, slots=True)
class ShearPiece:
    """Shears of one span at stations ``x`` along the beam [mm]; ``V_r`` is a magnitude [N]."""

    span: int
    x: Sequence[float]
    V_max: Sequence[float]
    V_min: Sequence[float]
    V_r: Sequence[float]


def moment_figure(outline: BeamOutline, pieces: Sequence[MomentPiece]) -> Figure:
    """Draw the moment envelope with the resistance; values at the peaks, faces marked."""
    demand = [_scaled(p.x, p.M_max, KNM) for p in pieces]
    demand += [_scaled(p.x, p.M_min, KNM) for p in pieces]
    resistance = [_scaled(p.x, p.M_r_pos, KNM) for p in pieces]
    resistance += [_scaled(p.x, [-abs(m) for m in p.M_r_neg], KNM) for p in pieces]
    low = [_peak(p.x, p.M_max, p.M_r_pos, 1.0, KNM, "M") for p in pieces]
    top = [mark for p in pieces for mark in _ends(outline, p)]
    return along_figure(
        outline,
        Along(
            spans=tuple(p.span for p in pieces),
            curves=(
                Curve("largest and smallest factored moment of all cases", demand, "solid"),
                Curve("resistance of the bars as detailed", resistance, "long"),
            ),
            above=tuple(top),
            below=tuple(mark for mark in low if mark is not None),
            label=(*symbol("M"), (", kN·m", "roman")),
            unit="kN·m",
            downward=True,
            note="Moments are drawn on the side in tension: positive moments below the axis.",
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
                    outline.faces(p.span),
                )
            ),
        ),
        "Moment envelope and resistance of the bars as detailed",
    )


def _scaled(x: Sequence[float], y: Sequence[float], factor: float) -> list[tuple[float, float]]:
    return [(a, factor * b) for a, b in zip(x, y, strict=True)]


def _value(name: str, sub: str, value: float) -> Runs:
    return (*symbol(name, sub), (f" = {fixed(value, 0)}", "roman"))


def _mark(x: float, demand: float, resistance: float, name: str) -> Mark:
    lines = (_value(name, "f", demand), _value(name, "r", resistance))
    return Mark(x, demand, lines)


def _peak(
    x: Sequence[float],
    demand: Sequence[float],
    resistance: Sequence[float],
    sign: float,
    factor: float,
    name: str,
) -> Mark | None:
    """Greatest demand of one sign with the resistance there; none where there is no such."""
    if not x:
        return None
    index = max(range(len(x)), key=lambda i: sign * demand[i])
    if sign * demand[index] <= 0.0:
        return None
    return _mark(x[index], factor * demand[index], sign * factor * abs(resistance[index]), name)


def _ends(outline: BeamOutline, piece: MomentPiece) -> list[Mark]:
    """Peaks of the negative moment in the left and the right half of the clear length."""
    start, end = outline.faces(piece.span)
    middle = (start + end) / 2
    marks: list[Mark] = []
    for low, high in ((start, middle), (middle, end)):
        inside = [i for i, x in enumerate(piece.x) if low - 1e-6 <= x <= high + 1e-6]
        mark = _peak(
            [piece.x[i] for i in inside],
            [piece.M_min[i] for i in inside],
            [piece.M_r_neg[i] for i in inside],
            -1.0,
            KNM,
            "M",
        )
        if mark is not None and not any(mark.x == other.x for other in marks):
            marks.append(mark)
    return marks


def shear_figure(
    outline: BeamOutline,
    pieces: Sequence[ShearPiece],
    stations: Sequence[float] = (),
    own: Mapping[float, float] = MappingProxyType({}),
) -> Figure:
    """Draw the shear envelope with the resistance of the zones, both signs.

    Values are printed at ``stations`` [mm], the critical sections; without them at the faces. A
    section beside a stretch without resistance has its ``own`` [N].
    Only between the critical sections of a span is a shear over the resistance marked: nearer
    the supports the shear of the critical section holds.
    """
    demand = [_scaled(p.x, p.V_max, KN) for p in pieces]
    demand += [_scaled(p.x, p.V_min, KN) for p in pieces]
    resistance = [_scaled(p.x, p.V_r, KN) for p in pieces]
    resistance += [_scaled(p.x, [-v for v in p.V_r], KN) for p in pieces]
    above: list[Mark] = []
    below: list[Mark] = []
    exceeded: list[tuple[float, float]] = []
    for piece in pieces:
        start, end = outline.faces(piece.span)
        critical = [x for x in stations if start <= x <= end]
        if critical:
            over = [
                max(high, -low) > V_r
                for high, low, V_r in zip(piece.V_max, piece.V_min, piece.V_r, strict=True)
            ]
            exceeded += _exceeded(piece.x, over, (min(critical), max(critical)))
        wanted = critical or [start, end]
        for x in wanted:
            high, low, V_r = (_at(piece.x, y, x) for y in (piece.V_max, piece.V_min, piece.V_r))
            V_r = V_r or own.get(x, 0.0)
            if high >= -low:
                above.append(_mark(x, KN * high, KN * V_r, "V"))
            else:
                below.append(_mark(x, KN * low, -KN * V_r, "V"))
    return along_figure(
        outline,
        Along(
            spans=tuple(p.span for p in pieces),
            curves=(
                Curve("largest and smallest factored shear of all cases", demand, "solid"),
                Curve("resistance of web and stirrups", resistance, "long"),
            ),
            above=tuple(above),
            below=tuple(below),
            label=(*symbol("V"), (", kN", "roman")),
            unit="kN",
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


def _at(x: Sequence[float], y: Sequence[float], station: float) -> float:
    """Interpolate; the nearest end beyond the stations."""
    if station <= x[0]:
        return y[0]
    for index in range(1, len(x)):
        if station <= x[index]:
            run = x[index] - x[index - 1]
            part = (station - x[index - 1]) / run if run else 1.0
            return y[index - 1] + part * (y[index] - y[index - 1])
    return y[-1]
