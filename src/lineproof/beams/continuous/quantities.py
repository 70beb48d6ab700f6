"""Quantities of a beam: concrete, formwork, steel.

What belongs to the beam is its stem below the slab and the slab over the width of the web, over
the whole length; the part over the supports is shown apart, since it is often counted with the
columns. The slab in the effective overhangs belongs to the slab and is shown for information.
Formwork is soffit and sides below the slab between the faces of supports, and the end of a
cantilever; at a beam without a slab the sides are the whole depth. An L-section has slab on one
side only, so its outer side is formed over the whole depth.
"""

from __future__ import annotations

from dataclasses import dataclass

from lineproof.beams.continuous.bending import rounded
from lineproof.beams.continuous.layout import BeamOutline
from lineproof.beams.continuous.schedule import Schedule

NOTE = (
    "Concrete of the beam: stem below the slab and slab over the width of the web, from end to "
    "end, the parts over the supports included. The slab in the effective overhangs is counted "
    "with the slab. Formwork: soffit and sides of the stem between faces of supports, and the "
    "ends of cantilevers. Steel by cut lengths, nominal areas and 7850 kg/m³, without waste."
)
_M2, _M3 = 1e-6, 1e-9


@dataclass(frozen=True, slots=True)
class Quantities:
    """Concrete to 0.01 m3, formwork to 0.1 m2, steel [kg]: as printed, so that sums follow."""

    stem: float
    over_supports: float
    slab_over_web: float
    slab_overhangs: float
    soffit: float
    sides: float
    ends: float
    steel: dict[str, float]

    @property
    def concrete(self) -> float:
        """Concrete of the beam [m3]."""
        return self.stem + self.over_supports + self.slab_over_web

    @property
    def formwork(self) -> float:
        """Formwork [m2]."""
        return self.soffit + self.sides + self.ends

    @property
    def mass(self) -> float:
        """All steel [kg]."""
        return sum(self.steel.values())

    @property
    def density(self) -> float:
        """Steel in the concrete of the beam [kg/m3]."""
        return self.mass / self.concrete


def quantities(outline: BeamOutline, bars: Schedule) -> Quantities:
    """Return the quantities of a beam from its outline and its schedule."""
    stem = joints = soffit = sides = overhangs = over_web = ends = 0.0
    for span in range(1, len(outline.lengths) + 1):
        start, end = outline.faces(span)
        first, last = outline.axes[span - 1 : span + 1]
        low = first - outline.supports[0].half if span == 1 else first
        high = last + outline.supports[-1].half if span == len(outline.lengths) else last
        below = outline.depths[span - 1] - outline.h_f
        clear, whole = end - start, high - low
        stem += clear * below * outline.b_w
        joints += (whole - clear) * below * outline.b_w
        over_web += whole * outline.h_f * outline.b_w
        overhangs += whole * outline.h_f * (outline.widths[span - 1] - outline.b_w)
        soffit += clear * outline.b_w
        sides += clear * _side_height(outline, span)
        ends += _free_ends(outline, span) * outline.depths[span - 1] * outline.b_w
    return Quantities(
        stem=rounded(stem * _M3, 2),
        over_supports=rounded(joints * _M3, 2),
        slab_over_web=rounded(over_web * _M3, 2),
        slab_overhangs=rounded(overhangs * _M3, 2),
        soffit=rounded(soffit * _M2, 1),
        sides=rounded(sides * _M2, 1),
        ends=rounded(ends * _M2, 1),
        steel=bars.mass_by_size(),
    )


def _side_height(outline: BeamOutline, span: int) -> float:
    """Height of both sides together."""
    depth = outline.depths[span - 1]
    below = depth - outline.h_f
    return {"T": 2 * below, "L": below + depth, "rectangular": 2 * depth}[outline.shape]


def _free_ends(outline: BeamOutline, span: int) -> int:
    pair = outline.supports[span - 1 : span + 1]
    return sum(support.kind == "free" for support in pair)
