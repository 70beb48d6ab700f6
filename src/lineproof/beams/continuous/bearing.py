"""Reactions: bearing on a support, hanger stirrups where a girder carries the beam."""

from __future__ import annotations

import math

import numpy as np

from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.shear_numbers import ShearBasis
from lineproof.beams.steps import Steps
from lineproof.formula import FROM_MEMORY
from lineproof.standards.a23_3 import bearing, shear_bars

_HANGERS = (
    "The girder carries the beam from the side: hanger stirrups take the whole reaction up to its "
    "top. They stand in the joint, beside and within the width of the beam, around the bottom bars "
    "of beam and girder, besides the stirrups for shear; the design of the girder must show them."
)


def largest_reaction(forces: Forces, support: int) -> tuple[int, float]:
    """Return the case of the largest upward reaction of a support, and that reaction [N]."""
    column = forces.solved.solution.reactions[:, support - 1]
    row = int(np.argmax(column))
    return row, float(column[row])


def hangers_needed(basis: ShearBasis, R_f: float) -> int:
    """Return how many stirrups carry a reaction up to the top of the girder."""
    needed = shear_bars.HANGERS.function(R_f, basis.phi_s, basis.f_y)
    return max(math.ceil(needed / basis.A_v * (1 - 1e-12)), 1)


def record_hangers(steps: Steps, number: int) -> None:
    """Record inside the open part the hanger stirrups for R_f; needs R_f and A_v in place."""
    steps.sheet.note(
        "hangers", _HANGERS, title="Hanger stirrups", clause="11.2.12", basis=FROM_MEMORY
    )
    steps.line(shear_bars.HANGERS)
    steps.bind(n_h=steps.sheet.given("n_h", str(number), source="chosen: least that carries"))
    steps.line(shear_bars.HANGER_LEGS)
    steps.check(shear_bars.HANGERS_PROVIDED)


def record_bearing(steps: Steps, *, narrow: bool = False) -> None:
    """Record inside the open part the bearing of the beam on its support.

    Needs R_f, b_w and the length of the bearing l_b in place; on a column that is ``narrow``, less
    wide across than the beam, its width b_col as well. The supporting surface counts no larger than
    the loaded area.
    """
    area = bearing.LOADED_AREA_NARROW if narrow else bearing.LOADED_AREA
    steps.bind(A_2=steps.line(area))
    steps.line(bearing.RESISTANCE)
    steps.check(bearing.STRENGTH)
