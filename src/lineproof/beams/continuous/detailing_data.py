"""What the detailing of a beam starts from: bars of its sections, strengths, stirrups, shear.

Plain data in N, mm, MPa, degrees; ``x`` along the beam as in ``layout``.
"""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Literal

import numpy as np

from lineproof.beams.analysis.curves import Floats
from lineproof.beams.bars import BarLayer, BarLayers
from lineproof.beams.continuous.forces import Demand, Forces
from lineproof.beams.continuous.layout import BeamOutline
from lineproof.standards.codes import CodePair

Expression = Literal["table", "general"]
"""Which expression of 12.2 gives the development length."""
THETA = 35.0
"""Angle of the diagonal compression where no shear design says otherwise [deg]."""
STOCK = 12_000.0
"""Longest bar [mm] where nothing else is said."""
END_COVER = 50.0
"""Concrete outside of the bars at the ends of the beam [mm], or the cover where that is more."""


@dataclass(frozen=True, slots=True)
class Strengths:
    """Strengths, resistance factors and what else of the materials anchorage depends on."""

    f_c: float
    f_y: float
    phi_c: float
    phi_s: float
    alpha_1: float
    a_max: float
    density: str = "normal"
    coating: str = "none"


@dataclass(frozen=True, slots=True)
class Stirrups:
    """Stirrups as anchorage counts them: the largest spacing along the beam.

    ``minimum`` says whether the minimum of 11.2.8.2 stands all along.
    """

    size: str
    legs: int
    spacing: float
    minimum: bool = True


@dataclass(frozen=True, slots=True)
class SupportTop:
    """Top bars of a support: layers in the web, and a count in all overhangs together.

    Those of the overhangs have the size of the first layer but for ``overhang_size``.
    """

    web: BarLayers = ()
    overhang: int = 0
    overhang_size: str = ""

    @property
    def spread(self) -> BarLayers:
        """The bars of the overhangs, as a layer; () for none."""
        if not self.overhang:
            return ()
        return (BarLayer(self.overhang, self.overhang_size or self.web[0].size),)


@dataclass(frozen=True, slots=True)
class SectionBars:
    """Bars of the sections before detailing.

    ``bottom`` holds one item a span (of a cantilever: the bars below), ``top`` one a support;
    ``holders`` is the size of the two bars that hold the stirrups between the top bars.
    """

    bottom: tuple[BarLayers, ...]
    top: tuple[SupportTop, ...]
    holders: str


@dataclass(frozen=True, slots=True)
class ShearStretch:
    """Shear resistance over a stretch of the beam: whole, of the stirrups, and the angle.

    Each is the smallest of all cases by itself; ``cases`` says of which, by symbol.
    """

    start: float
    end: float
    V_r: float
    V_s: float
    theta: float = THETA
    cases: Mapping[str, str] = field(default_factory=dict, compare=False)


@dataclass(frozen=True, eq=False, slots=True)
class TorsionForces:
    """What torsion asks of the bars of a span in which it counts.

    ``bottom`` and ``top`` are the forces [N] that the bars of each face need at the stations ``x``
    from the left axis, moment and shear included (11.3.10.6). ``ends`` holds the torsion designed
    for at both faces, case by case [N.mm], 0 where it does not count. The forces have what the
    layout keeps in hand. ``sections`` are the stations of the sections of shear from the left axis
    (cases, columns), ``by_case`` the force [N] in the bottom and the top bars there, 0 where
    torsion does not count and nearer to a support than its critical section.
    """

    x: Floats
    bottom: Floats
    top: Floats
    ends: tuple[Floats, Floats]
    p_h: float
    A_o: float
    sections: Floats
    by_case: tuple[Floats, Floats]


@dataclass(frozen=True, eq=False)
class Basis:
    """What a development length depends on besides the bar itself."""

    outline: BeamOutline
    strengths: Strengths
    stirrups: Stirrups
    expression: Expression = "table"


@dataclass(frozen=True, eq=False)
class Designed:
    """A beam whose sections are designed and whose bars are to be laid.

    ``shear`` may be empty: then no stirrups are counted against the tension that shear leaves in
    the bars, and no bar is cut in a tension zone. ``breadths`` gives the width of a column across
    the beam by support number, where it is known. ``end_cover`` is the concrete outside of the
    bars at the ends of the beam, ``tail_cover`` that outside of given hooks where it is less,
    ``stock`` the longest bar. ``end_forces`` [N] of 11.3.9.5 by
    support number replace those found here. ``torsion`` is known, by span, where torsion counts:
    there the bottom bars run through. ``restrained`` holds the numbers of the end supports that are
    analysed as simple and designed for an assumed restraint. ``as_built`` tells that bars and
    stirrups are both given: nothing is laid beside them; ``hook_ties`` gives then the spacing [mm]
    of the ties that stand around hooks, by the number of the end support.
    """

    basis: Basis
    forces: Forces
    bars: SectionBars
    pair: CodePair
    shear: tuple[ShearStretch, ...] = ()
    breadths: Mapping[int, float] = field(default_factory=dict)
    end_cover: float = END_COVER
    tail_cover: float = math.inf
    stock: float = STOCK
    end_forces: Mapping[int, float] = field(default_factory=dict)
    torsion: Mapping[int, TorsionForces] = field(default_factory=dict)
    restrained: frozenset[int] = frozenset()
    as_built: bool = False
    hook_ties: Mapping[int, float] = field(default_factory=dict)

    @property
    def outline(self) -> BeamOutline:
        """The concrete of the beam."""
        return self.basis.outline

    @property
    def c_tail(self) -> float:
        """The concrete outside of the tails of hooks [mm]."""
        return min(self.end_cover, self.tail_cover)

    @property
    def strengths(self) -> Strengths:
        """The strengths."""
        return self.basis.strengths

    @cached_property
    def sags(self) -> tuple[Demand, ...]:
        """The largest moment of every span, between the faces."""
        return tuple(self.forces.sag(k) for k in range(1, len(self.outline.lengths) + 1))

    @cached_property
    def shear_table(self) -> tuple[Floats, Floats, Floats]:
        """Start and end of all stretches, and their rank, as arrays: the weakest stirrups first."""
        rows = [(s.start, s.end, s.V_s, s.V_r) for s in self.shear]
        start, end, V_s, V_r = np.array(rows, dtype=float).reshape(-1, 4).T.copy()
        return start, end, np.lexsort((V_r, V_s)).argsort().astype(float)

    def cantilever(self, span: int) -> bool:
        """Whether a span is a cantilever."""
        return any(s.kind == "free" for s in self.outline.supports[span - 1 : span + 1])

    def exterior(self, support: int) -> bool:
        """Whether a support is the last one of the beam that holds it at that end."""
        return support in (1, len(self.outline.supports)) and self.held(support)

    def held(self, support: int) -> bool:
        """Whether a support is no free end."""
        return self.outline.supports[support - 1].kind != "free"
