"""Shear at an end with the assumed moment of restraint, a case of its own: the top in tension.

The moment of the face counts at the critical section as well, which is to the safe side.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.shear_arrays import value
from lineproof.beams.continuous.shear_numbers import ShearBasis, SpanNumbers, area_at, depth_at
from lineproof.beams.continuous.shear_resistance import resistances
from lineproof.standards.a23_3 import shear_bars, torsion


def restrained(
    basis: ShearBasis, numbers: SpanNumbers, v: dict[str, Any]
) -> dict[int, dict[str, Any]]:
    """Return the values of the critical sections of the ends whose restraint is assumed.

    By column, 0 for the left and -1 for the right one, as arrays (cases, 1). ``v`` are the values
    of all columns without the restraint.
    """
    made = {}
    for column, end in ((0, numbers.left), (-1, numbers.right)):
        if end.moment <= 0:
            continue
        x, V_f = v["x"][:, [column]], v["V_f"][:, [column]] + end.restraint
        M = np.full_like(x, -end.moment)
        w = {name: each for name, each in v.items() if not isinstance(each, np.ndarray)}
        w |= {
            "x": x, "M": M, "M_f": np.abs(M), "V_f": V_f, "T_all": v["T_all"][:, [column]],
            "d": depth_at(numbers.top, x), "A_s": area_at(numbers.top, x),
            "A_sp": area_at(numbers.bottom, x),
        }  # fmt: skip
        made[column] = w | resistances(basis, numbers, w)
    return made


def tension(w: dict[str, Any], effective: Floats, basis: ShearBasis) -> Floats:
    """Return the force in the top bars of such a section for stirrups 1/s [1/mm] that count [N]."""
    V_s = w["cot"] * (effective - 2 * w["a_t"] / basis.A_v)
    w = w | {"V_s": V_s}
    made: Floats = value(shear_bars.TENSION_SIDE, w)
    if w["counts"].any():
        w["V_le"] = value(torsion.SHEAR_IN_BARS, w)
        made = np.where(w["counts"], value(torsion.TENSION_SIDE, w), made)
    return made
