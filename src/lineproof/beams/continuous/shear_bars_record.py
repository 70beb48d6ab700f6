"""The bars along the beam that shear requires, as recorded lines (11.3.9)."""

from __future__ import annotations

from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.steps import Steps
from lineproof.formula import FROM_MEMORY
from lineproof.standards.a23_3 import shear_bars, torsion

_ALONG = (
    "Along the span the bars reach past the point where the moment alone needs them by "
    "at least the effective shear depth times cot θ, which stands for the force that shear adds "
    "(11.3.9.1)."
)


def record_bars(steps: Steps, section: ShearSection) -> None:
    """Record inside the open part the forces in the bars of both faces, and their checks.

    Needs M_f, V_f, V_s, d_v, theta, ``A_s``, ``A_sp`` in place; ``A_sr`` where ``section.cap`` is
    set and ``A_sb`` (bottom bars developed at the inner edge of the bearing) where
    ``section.bearing`` is.
    """
    if section.place == "station" and not section.counts:
        steps.sheet.note(
            "bars-along", _ALONG, title="Bars along the beam", clause="11.3.9.1", basis=FROM_MEMORY
        )
        return
    clause = torsion if section.counts else shear_bars
    if section.counts:
        steps.line(torsion.SHEAR_IN_BARS)
    steps.line(clause.TENSION_SIDE)
    steps.bind(A_sd=steps.entry("A_s"))
    if section.cap is None:
        steps.check(shear_bars.TENSION_SIDE_HOLDS)
    else:
        steps.line(shear_bars.TENSION_SIDE_CAPPED)
        steps.check(shear_bars.CAPPED_HOLDS)
    if steps.line(clause.COMPRESSION_SIDE).value > 0:
        steps.check(shear_bars.COMPRESSION_SIDE_HOLDS)
    if section.bearing is not None:
        steps.line(clause.END_SUPPORT)
        steps.line(shear_bars.AREA_END_SUPPORT)
        steps.check(shear_bars.END_SUPPORT_HOLDS, A_sd=steps.entry("A_sb"))
