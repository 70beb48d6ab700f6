"""What the shear of a span rests on, as plain numbers: materials, bars, supports, stirrups.

Lengths in mm, areas in mm2, forces in N, stresses in MPa. ``x`` is measured from the left axis of
the span.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.continuous.layout import SAME_PLACE
from lineproof.beams.continuous.torsion import SpanTorsion
from lineproof.errors import FaultList
from lineproof.standards.a23_3 import shear_factors
from lineproof.standards.a23_3.bars import BARS

Method = Literal["general", "simplified"]
METHODS: tuple[Method, ...] = ("general", "simplified")
Held = Literal["direct", "indirect", "free"]
"""How a support holds the span: from below, by a girder it frames into, or not at all."""
DEEPEST = 2.0
"""Clear span over depth below which a beam is deep (10.7)."""


@dataclass(frozen=True, slots=True)
class ShearBasis:
    """What is alike over the whole beam.

    ``cover`` is clear, to the stirrups; ``closed`` stirrups are closed around all bars with hooks
    of 135 degrees.
    """

    b_w: float
    f_c: float
    f_y: float
    phi_c: float
    phi_s: float
    lambda_: float
    a_max: float
    cover: float
    method: Method = "general"
    stirrup: str = "10M"
    legs: int = 2
    closed: bool = False
    E_s: float = 200_000.0

    @property
    def A_t(self) -> float:
        """Area of one leg."""
        return BARS.number(self.stirrup, "A_b")

    @property
    def A_v(self) -> float:
        """Area of the legs of one stirrup."""
        return self.legs * self.A_t

    @property
    def d_bs(self) -> float:
        """Diameter of the stirrup."""
        return BARS.number(self.stirrup, "d_b")


@dataclass(frozen=True, slots=True)
class Stretch:
    """Bars of one face that count between two stations: area as developed, depth to their centre.

    The area is that on the face, whatever the sign of the moment.
    """

    start: float
    end: float
    A_s: float
    d: float


@dataclass(frozen=True, slots=True)
class SpanEnd:
    """One end of a span for shear.

    ``A_bearing`` is the area of bottom bars developed at the inner edge of an exterior bearing;
    ``A_sr`` the top bars that the largest moment at this face alone requires, if it may cap the
    force in the bars (11.3.9.4). ``restraint`` is the shear that an assumed moment of restraint
    adds at this end [N], ``moment`` that moment itself [N.mm], the top in tension.
    """

    held: Held = "direct"
    exterior: bool = False
    A_bearing: float = 0.0
    A_sr: float | None = None
    restraint: float = 0.0
    moment: float = 0.0


@dataclass(frozen=True, slots=True)
class SpanNumbers:
    """One span for shear: depth, bars of both faces from left to right, ends.

    ``A_sr`` is the area of bottom bars that the largest moment of the span alone requires.
    """

    span: int
    h: float
    bottom: tuple[Stretch, ...]
    top: tuple[Stretch, ...]
    left: SpanEnd = SpanEnd()
    right: SpanEnd = SpanEnd()
    A_sr: float | None = None
    torsion: SpanTorsion | None = None

    @property
    def faces(self) -> tuple[tuple[Stretch, ...], tuple[Stretch, ...]]:
        """The bars of both faces: bottom, top."""
        return self.bottom, self.top


def area_at(bars: Sequence[Stretch], x: Floats) -> Floats:
    """Return the area of the bars of a face at stations; where stretches meet, the smaller.

    The stretches stand in order from left to right and do not overlap.
    """
    start, end, area, _ = _table(bars)
    at = np.clip(np.searchsorted(start, x + SAME_PLACE, side="right") - 1, 0, None)
    found = np.full(np.shape(x), np.inf)
    for n in (at, np.maximum(at - 1, 0)):
        inside = (x >= start[n] - SAME_PLACE) & (x <= end[n] + SAME_PLACE)
        found = np.where(inside, np.minimum(found, area[n]), found)
    return np.where(np.isinf(found), 0.0, found)


def depth_at(bars: Sequence[Stretch], x: Floats) -> Floats:
    """Return the depth to the bars of a face at stations; outside them that of the nearest."""
    start, end, _, depth = _table(bars)
    at = np.clip(np.searchsorted(start, x + SAME_PLACE, side="right") - 1, 0, None)
    after = np.minimum(at + 1, len(start) - 1)
    nearer_after = (x > end[at]) & (start[after] - x < x - end[at])
    made: Floats = np.where(nearer_after & (after > at), depth[after], depth[at])
    return made


def _table(bars: Sequence[Stretch]) -> Floats:
    """Return starts, ends, areas and depths as rows."""
    made: Floats = np.array([(s.start, s.end, s.A_s, s.d) for s in bars]).T
    return made


def check_basis(basis: ShearBasis) -> None:
    """Refuse what the method does not hold for; raises :class:`UserError` with all faults."""
    faults = FaultList()
    if basis.method not in METHODS:
        faults.add(f"shear_method: {basis.method!r}; write one of {', '.join(METHODS)}")
    if basis.method == "simplified":
        if not shear_factors.GRADE_FOR_SIMPLIFIED.holds(basis.f_y, 400.0):
            faults.add(
                f"shear_method: 'simplified' holds up to bars of 400 MPa, but f_y is "
                f"{basis.f_y:g} MPa; write 'general'"
            )
        if not shear_factors.CONCRETE_FOR_SIMPLIFIED.holds(basis.f_c, 60.0):
            faults.add(
                f"shear_method: 'simplified' holds up to concrete of 60 MPa, but f_c is "
                f"{basis.f_c:g} MPa; write 'general'"
            )
    if basis.legs < 2:  # noqa: PLR2004 - a stirrup goes around the section
        faults.add(f"stirrup_legs: {basis.legs} given; write 2 or more")
    faults.raise_if_any()


def check_span(numbers: SpanNumbers, clear: float) -> None:
    """Refuse deep beams and faces without bars; raises :class:`UserError` with all faults."""
    faults = FaultList()
    if numbers.left.held != "free" != numbers.right.held and clear < DEEPEST * numbers.h:
        faults.add(
            f"span {numbers.span}: its clear length of {clear / 1000:g} m is less than twice h of "
            f"{numbers.h:g} mm: a deep beam is outside the method for shear; use strut-and-tie "
            "(A23.3, 10.7), or write a shallower beam"
        )
    for face, bars in (("bottom", numbers.bottom), ("top", numbers.top)):
        if not bars:
            faults.add(
                f"span {numbers.span}: no {face} bars; write those that hold the stirrups at least"
            )
    faults.raise_if_any()
