"""Deflected shapes of a span by curvature, for the figure beside the limits."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.curvature import (
    Shape,
    Stiffness,
    cantilever_moments,
    curvatures,
    integrated,
    span_moments,
)
from lineproof.beams.continuous.deflection import Deflections, SpanSection, from_root
from lineproof.beams.continuous.deflection_service import STAGES, Stage, StageMoments


@dataclass(frozen=True, eq=False, slots=True)
class DeflectedShapes:
    """Deflections [mm], positive downward, at stations from the left axis of the span [mm].

    ``immediate`` under dead and all live load, ``attached`` after parts are attached, ``total`` in
    the end.
    """

    x: Floats
    immediate: Floats
    attached: Floats
    total: Floats


def stiffness_of(section: SpanSection, found: Deflections) -> Stiffness:
    """Return what bends the span; a place without a section of its own takes one it does not use.

    The moment at a simple or free end is zero, so the other end's section stands for it.
    """
    inertias = {name: made.I_cr for name, made in found.cracked.items()}
    one = next(iter(inertias.values()))
    ends = inertias.get("left", inertias.get("right", one))
    return Stiffness(
        section.E_c, section.I_g, found.I_gw, inertias.get("midspan", one),
        inertias.get("left", ends), inertias.get("right", ends), found.M_crd, found.M_crdn,
    )  # fmt: skip


def deflected_shapes(
    section: SpanSection, moments: Mapping[Stage, StageMoments], found: Deflections
) -> DeflectedShapes:
    """Return the deflected shapes of a span; a cantilever's with the rotation of its root."""
    bent = {stage: _bent(section, moments[stage], found, stage) for stage in STAGES}
    y_s, y = bent["sustained"].y, bent["all"].y
    later = found.zeta_s - found.zeta_sa
    return DeflectedShapes(
        bent["all"].x, y, later * y_s + (y - y_s), found.zeta_s * y_s + (y - y_s)
    )


def _bent(section: SpanSection, moments: StageMoments, found: Deflections, stage: Stage) -> Shape:
    stiffness, l, m = stiffness_of(section, found), section.l, moments
    if not section.free:
        M = span_moments(l, m.M_m, m.M_h1, m.M_h2, m.points)
        return integrated(l, curvatures(M, stiffness))
    M = cantilever_moments(l, m.M_h1, from_root(section, m.points))
    made = integrated(l, curvatures(M, stiffness), slope=found.stages[stage].theta_r)
    return made if section.free == "right" else Shape(made.x, made.y[::-1].copy())
