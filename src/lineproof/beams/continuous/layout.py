"""A beam as it is built: its outline, bars and stirrups as plain data.

Lengths in mm. ``x`` along the beam runs from the axis of support 1 to the right; it is negative
left of that axis. Spans and supports are numbered from 1; span k lies between supports k and
k + 1. A cantilever is an end span whose outer support is ``free``.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from itertools import accumulate
from typing import Literal

from lineproof.beams.analysis.model import SupportKind
from lineproof.beams.inputs import Shape
from lineproof.standards.a23_3.bars import BARS

Face = Literal["bottom", "top"]
Hook = Literal["", "90", "180"]
Carrier = Literal["column", "girder", "wall", "none"]
"""What stands below a support; ``none`` at a free end."""
SAME_PLACE = 1e-6
"""Distance [mm] up to which a station is where two stretches meet: no last bit decides which."""


@dataclass(frozen=True, slots=True)
class BuiltSupport:
    """A support as built: width along the beam, how it holds the beam, what it is."""

    width: float
    kind: SupportKind
    carrier: Carrier

    @property
    def half(self) -> float:
        """Distance of a face from the axis."""
        return self.width / 2


@lru_cache(maxsize=1024)
def _axes(lengths: tuple[float, ...]) -> tuple[float, ...]:
    return tuple(accumulate(lengths, initial=0.0))


@dataclass(frozen=True, slots=True)
class BeamOutline:
    """The concrete of a beam: one web width, a depth a span; ``h_f`` is 0 without a slab.

    ``widths`` are the effective flange widths, one a span (``b_w`` without a slab). ``cover`` is
    clear, to the stirrups.
    """

    shape: Shape
    lengths: tuple[float, ...]
    depths: tuple[float, ...]
    widths: tuple[float, ...]
    supports: tuple[BuiltSupport, ...]
    b_w: float
    h_f: float
    cover: float

    @property
    def axes(self) -> tuple[float, ...]:
        """Distances of the support axes from the axis of support 1."""
        return _axes(self.lengths)

    def faces(self, span: int) -> tuple[float, float]:
        """Return where the clear length of a span starts and ends, along the beam."""
        left, right = self.axes[span - 1 : span + 1]
        return left + self.supports[span - 1].half, right - self.supports[span].half

    @property
    def ends(self) -> tuple[float, float]:
        """Outer ends of the concrete: the outer faces of the end supports."""
        return -self.supports[0].half, self.axes[-1] + self.supports[-1].half

    def end_at(self, support: int) -> tuple[float, int]:
        """Return the outer end of the concrete at an end support, and 1 or -1: inward from it."""
        return (self.ends[0], 1) if support == 1 else (self.ends[1], -1)


@dataclass(frozen=True, slots=True)
class BarRun:
    """Identical bars side by side over one stretch of the beam.

    ``start`` and ``end`` are the outermost points of the bar along the beam, the outside of a
    hook included. ``layer`` 1 lies nearest its face. ``place`` tells whether the bars stand
    within the web or in the overhangs (``number`` counts all overhangs together). ``serves`` says
    in words what the bars are for (``span 2``, ``support 3``, ``holds the stirrups``).
    """

    face: Face
    layer: int
    number: int
    size: str
    start: float
    end: float
    place: Literal["web", "overhang", "side face"] = "web"
    hook_start: Hook = ""
    hook_end: Hook = ""
    serves: str = ""
    mark: str = ""

    def bent_at(self, support: int) -> Hook:
        """Return the hook at an end of the beam, by the number of its support: 1 or the last."""
        return self.hook_start if support == 1 else self.hook_end

    @property
    def outside(self) -> bool:
        """Whether they stand in the overhangs, outside the stirrups and ties of the web."""
        return self.place == "overhang"

    @property
    def area(self) -> float:
        """Area of all its bars [mm2]."""
        return self.number * BARS.number(self.size, "A_b")

    @property
    def diameter(self) -> float:
        """Diameter of one bar [mm]."""
        return BARS.number(self.size, "d_b")


@dataclass(frozen=True, slots=True)
class StirrupZone:
    """Stirrups at one spacing: the first stands at ``start``, the last at ``end``, along the beam.

    ``closed`` stirrups are closed around all bars with 135 degree hooks, for torsion; those
    ``around_hooks`` are the ties of 12.5.4 in an end support, which carry no shear.
    """

    span: int
    start: float
    end: float
    number: int
    spacing: float
    size: str
    legs: int = 2
    closed: bool = False
    mark: str = ""
    around_hooks: bool = False


def places_of(zone: StirrupZone) -> tuple[float, ...]:
    """Return where the stirrups of a zone stand along the beam [mm]."""
    step = (zone.end - zone.start) / max(zone.number - 1, 1)
    return tuple(zone.start + number * step for number in range(zone.number))


@dataclass(frozen=True, slots=True)
class Detailing:
    """All bars and stirrups of a beam."""

    bars: tuple[BarRun, ...]
    stirrups: tuple[StirrupZone, ...]
