"""Tension with torsion along the bars as detailed (11.3.10.6), where torsion counts.

It is that of the sections of shear, each case with its own moment, shear, torsion and angle, and
has no cap. Nearer to a support than its critical section that section stands for it.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.detailing_data import Designed
from lineproof.beams.continuous.layout import Face
from lineproof.beams.continuous.resistance import Standing, provide, yield_force
from lineproof.beams.continuous.resistance_ratio import ratios_of


@dataclass(frozen=True, slots=True)
class TurnedStation:
    """The section of shear at which the tension with torsion uses the bars of a face most.

    ``local`` from the left axis of the span [mm]; force and resistance [N]; ``row`` and ``column``
    are those of the check of the span.
    """

    local: float
    F: float
    F_r: float
    row: int
    column: int


def worst_turned(
    designed: Designed, standing: Iterable[Standing], face: Face, span: int
) -> TurnedStation | None:
    """Return that station of a span; None where torsion does not count there."""
    turned = designed.torsion.get(span)
    if turned is None:
        return None
    force = turned.by_case[0 if face == "bottom" else 1]
    places, back = np.unique(turned.sections, return_inverse=True)
    x = places + designed.outline.axes[span - 1]
    A = provide(designed, standing, face, x, np.full(len(x), span)).A
    held = (A * yield_force(designed))[back.reshape(force.shape)]
    used = ratios_of(force, held)
    if not used.any():
        return None
    row, column = (int(n) for n in np.unravel_index(int(used.argmax()), used.shape))
    local = float(turned.sections[row, column])
    return TurnedStation(local, float(force[row, column]), float(held[row, column]), row, column)


def turned_at(designed: Designed, face: Face, span: int, local: Floats) -> Floats:
    """Return the largest tension with torsion of all cases at stations of a span [N].

    On the straight line between two sections of shear; beside the last that has any, its own. Zero
    where torsion does not count.
    """
    turned = designed.torsion.get(span)
    made = np.zeros(len(local))
    if turned is None:
        return made
    forces = turned.by_case[0 if face == "bottom" else 1]
    for places, force in zip(turned.sections, forces, strict=True):
        order = np.argsort(places, kind="stable")  # the critical sections stand beside the faces
        x, F = places[order], force[order]
        after = np.clip(np.searchsorted(x, local), 1, len(x) - 1)
        before = after - 1
        ended = (F[before] == 0) | (F[after] == 0)
        between = np.where(ended, np.maximum(F[before], F[after]), np.interp(local, x, F))
        made = np.maximum(made, between)
    return made
