"""Strain, concrete and stirrups of every pair of moment and shear of a span, on arrays."""

from __future__ import annotations

from typing import Any

import numpy as np

from lineproof.beams.continuous.shear_arrays import holds, sides, value
from lineproof.beams.continuous.shear_numbers import ShearBasis, SpanNumbers
from lineproof.beams.continuous.torsion import designed_for
from lineproof.standards.a23_3 import shear, shear_factors, torsion

MOST_STRAIN = 0.003
"""Range of the longitudinal strain of the general method."""
COARSE = 20.0
"""Size of aggregate from which the simplified method needs no s_ze [mm] (11.3.6.3)."""
LEAST_AREA = 1e-3
"""Area that stands for none, so that the strain is large instead of undefined [mm2]."""


def resistances(basis: ShearBasis, numbers: SpanNumbers, v: dict[str, Any]) -> dict[str, Any]:
    """Return what the catalogue gives for pairs: strain, V_c, what is asked of the stirrups."""
    v = dict(v)
    v["d_v"] = value(shear.D_V, v)
    _torsion(numbers, v)
    _strain(basis, v)
    v["a_t"] = np.zeros_like(v["M"])
    if numbers.torsion is not None:
        v["a_t"] = np.where(v["counts"], value(torsion.LEG_FOR_TORSION, v), 0.0)
    v["V_c"] = value(shear.V_C, v)
    v["V_plain"] = value(shear.V_C, v | {"beta": v["beta_plain"]})
    v["V_rmax"] = value(shear.V_R_MAX, v)
    v["cot"] = value(shear.V_S, v | {"s": 1.0})
    v["needed"] = (value(torsion.LEGS_FOR_SHEAR, v) + 2 * v["a_t"]) / basis.A_v
    v["closer"] = holds(shear.CLOSER, v) | v["counts"]
    v["s_max"] = np.where(v["closer"], value(shear.S_MAX_HALVED, v), value(shear.S_MAX, v))
    return v


def _torsion(numbers: SpanNumbers, v: dict[str, Any]) -> None:
    """Find where torsion counts, the torsion designed for and how it uses the section."""
    nothing = np.zeros_like(v["M"])
    v["counts"], v["section"], v["T_f"] = nothing.astype(bool), nothing, nothing
    if numbers.torsion is None:
        return
    v |= numbers.torsion.values
    v["counts"] = holds(torsion.COUNTS, v | {"T_f": v["T_all"]})
    v["T_f"] = np.where(v["counts"], designed_for(numbers.torsion, v["T_all"]), 0.0)
    stress, limit = sides(torsion.SECTION, v)
    v["section"] = np.where(v["counts"], stress / limit, 0.0)


def _strain(basis: ShearBasis, v: dict[str, Any]) -> None:
    """Find strain, factor and angle by the chosen method, with minimum stirrups and without.

    The strain asked is kept beyond its range where no bars count in tension, by either method:
    there is no resistance.
    """
    v["a_g"] = value(shear_factors.A_G, v)
    v["s_ze"] = value(shear_factors.S_ZE, v | {"s_z": v["d_v"]})
    bare = v["A_s"] <= 0
    v["A_s"] = np.maximum(v["A_s"], LEAST_AREA)
    asked = value(shear_factors.EPS_X, v)
    if v["counts"].any():
        v["V_fe"] = value(torsion.SHEAR_IN_STRAIN, v)
        asked = np.where(v["counts"], value(torsion.EPS_X, v), asked)
    if basis.method == "simplified":
        v["eps_asked"] = np.where(bare, asked, 0.0)
        row = shear_factors.SIMPLIFIED.rows["minimum stirrups or more"]
        v["beta"] = np.full_like(v["M"], float(row["beta"]))
        v["theta"] = np.full_like(v["M"], float(row["theta"]))
        coarse = v["a_g"] >= COARSE
        v["beta_plain"] = value(shear_factors.BETA_D_V if coarse else shear_factors.BETA_S_ZE, v)
        return
    v["eps_asked"] = asked
    v["eps_x"] = np.minimum(asked, MOST_STRAIN)
    v["beta"], v["theta"] = value(shear_factors.BETA_STIRRUPS, v), value(shear_factors.THETA, v)
    v["beta_plain"] = value(shear_factors.BETA_GENERAL, v)
