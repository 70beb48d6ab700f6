"""Torsion of an edge beam as plain numbers: torque along the span, section, threshold.

The ends of a span are held against turning at the faces of its supports, so a uniform torque gives
T = t (l_n/2 - x) from the near face. N, mm and MPa.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.shear_arrays import value
from lineproof.beams.inputs import Shape
from lineproof.errors import UserError
from lineproof.standards.a23_3 import torsion as clause
from lineproof.standards.a23_3.bars import BARS

AREAS = {"L": (clause.AREA_L, clause.PERIMETER_L), "T": (clause.AREA_T, clause.PERIMETER_T)}


@dataclass(frozen=True, slots=True)
class SpanTorsion:
    """Torque along one span and what resists it.

    ``torques`` [N.mm/mm] by load type; ``compatibility``: the frame can redistribute the torsion,
    so that 0.67 T_cr is enough; ``d_b`` is the diameter of the thinnest bar in a corner of the
    stirrups; ``values`` the constants of the section by symbol.
    """

    torques: Mapping[str, float]
    compatibility: bool
    d_b: float
    values: Mapping[str, float] = field(repr=False)

    @classmethod
    def of(
        cls,
        torques: Mapping[str, float],
        *,
        compatibility: bool,
        d_b: float,
        shape: Shape,
        b_w: float,
        h: float,
        h_f: float,
        b_o: float,
        cover: float,
        stirrup: str,
        f_c: float,
        lambda_: float,
        phi_c: float,
    ) -> SpanTorsion:
        """Work out the constants of the section.

        The overhang ``b_o`` counts only in the torsion at which the whole section cracks, which
        is the larger: it limits what may be redistributed.
        """
        v: dict[str, Any] = dict(
            b_w=b_w, h=h, h_f=h_f, b_o=b_o, c_c=cover, d_bs=BARS.number(stirrup, "d_b"), f_c=f_c,
            lambda_=lambda_, phi_c=phi_c,
        )  # fmt: skip
        made = [
            clause.AREA_RECTANGLE, clause.PERIMETER_RECTANGLE, clause.T_CR, clause.AREA_OF_STIRRUP,
            clause.PERIMETER_OF_STIRRUP, clause.A_O,
        ]  # fmt: skip
        if shape in AREAS:
            made += [clause.OVERHANG, *AREAS[shape], clause.T_CR_FLANGE]
        for formula in made:
            v[formula.symbol] = value(formula, v)
        v["T_crd"] = v.get("T_crf", v["T_cr"])
        kept = ("T_cr", "T_crd", "A_o", "A_oh", "p_h")
        return cls(dict(torques), compatibility, d_b, {name: float(v[name]) for name in kept})


def torque_per_length(torsion: SpanTorsion, forces: Forces, span: int) -> Floats:
    """Return the torque per length of every case (cases,), by the factors on the span's loads.

    Raises :class:`UserError` for a load type of which the span has no load.
    """
    rows = forces.solution.rows
    factors = np.zeros(len(rows))
    for kind, torque in torsion.torques.items():
        if (kind, span) not in rows:
            raise UserError(
                f"torques: span {span} has a torque by {kind}, but no load of that type; write "
                "the load that turns the beam as a load as well, or leave the torque out"
            )
        factors[rows.index((kind, span))] = torque
    made: Floats = forces.factors @ factors
    return made


def designed_for(torsion: SpanTorsion, T_f: Floats) -> Floats:
    """Return the torsion designed for: all of it, or what is left after redistribution."""
    if not torsion.compatibility:
        return T_f
    made: Floats = value(clause.COMPATIBILITY, {"T_f": T_f, "T_cr": torsion.values["T_crd"]})
    return made
