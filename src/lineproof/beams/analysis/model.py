"""A continuous beam and its loads as plain data, checked as a whole before it is solved.

Lengths in mm, forces in N. Spans and supports are numbered from 1, from left to right, as on the
page: span k lies between supports k and k + 1, and a cantilever is an end span whose outer support
is free. Loads act downward when positive.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Literal

from lineproof.errors import FaultList

SupportKind = Literal["simple", "fixed", "elastic", "free"]
FarEnd = Literal["fixed", "pinned"]
KINDS = ("simple", "fixed", "elastic", "free")
FAR_ENDS: Mapping[str, float] = {"fixed": 4.0, "pinned": 3.0}
"""Rotational stiffness of a column at the beam, in EI/l, by how its far end is held."""

LEAST_SPAN, MOST_SPAN = 100.0, 60_000.0
MOST_SPANS = 100
MOST_EI_RATIO = 1e4
"""Stiffer spans than this beside each other are a slip of units, and cost digits."""


@dataclass(frozen=True, slots=True)
class Span:
    """One span: length between support axes [mm] and bending stiffness EI [N.mm2]."""

    length: float
    EI: float

    @classmethod
    def of(cls, length: float, E: float, I: float) -> Span:
        """Return a span from length [mm], modulus [MPa] and moment of inertia [mm4]."""
        return cls(length, E * I)


@dataclass(frozen=True, slots=True)
class Column:
    """A column above or below a support: height [mm], EI [N.mm2] and how its far end is held."""

    length: float
    EI: float
    far_end: FarEnd = "fixed"

    @property
    def stiffness(self) -> float:
        """Rotational stiffness at the beam: 4EI/l or 3EI/l [N.mm per radian]."""
        return FAR_ENDS[self.far_end] * self.EI / self.length


@dataclass(frozen=True, slots=True)
class Support:
    """One support: kind, width along the beam [mm], rotational stiffness if elastic [N.mm].

    The width is centred on the support axis. A free end is a ``free`` support.
    """

    kind: SupportKind = "simple"
    width: float = 0.0
    stiffness: float = 0.0

    @classmethod
    def columns(cls, columns: Sequence[Column], width: float = 0.0) -> Support:
        """Return an elastic support held by the columns above and below it."""
        faults = FaultList()
        for number, column in enumerate(columns, start=1):
            _check_positive(faults, f"column {number}: length", column.length, "mm")
            _check_positive(faults, f"column {number}: EI", column.EI, "N.mm2")
            if column.far_end not in FAR_ENDS:
                faults.add(
                    f"column {number}: far end {column.far_end!r}; write 'fixed' or 'pinned'"
                )
        if not columns:
            faults.add("columns: none given; write at least one column, or a simple support")
        faults.raise_if_any()
        return cls("elastic", width, sum(column.stiffness for column in columns))

    @property
    def half(self) -> float:
        """Distance of a face from the axis [mm]."""
        return self.width / 2


SIMPLE, FIXED, FREE = Support("simple"), Support("fixed"), Support("free")


@dataclass(frozen=True, slots=True)
class UniformLoad:
    """A load over a whole span: load type ("D", "L", "S", ...), span number, w [N/mm]."""

    kind: str
    span: int
    w: float


@dataclass(frozen=True, slots=True)
class PartialLoad:
    """A uniform load over part of a span: w [N/mm] from ``start`` to ``end`` [mm]."""

    kind: str
    span: int
    w: float
    start: float
    end: float


@dataclass(frozen=True, slots=True)
class PointLoad:
    """A point load P [N] at a distance ``at`` [mm] from the left end of the span."""

    kind: str
    span: int
    P: float
    at: float


Load = UniformLoad | PartialLoad | PointLoad


@dataclass(frozen=True)
class Beam:
    """A beam of one or more spans; raises :class:`UserError` with all faults if it cannot stand.

    >>> Beam((Span(6000, 2e13),), (Support("simple"), Support("free")))
    Traceback (most recent call last):
    lineproof.errors.UserError: supports: the beam is unstable: it turns about support 1, its \
only support, which is simple; write ', fixed' behind it, or add a support
    """

    spans: tuple[Span, ...]
    supports: tuple[Support, ...]

    def __post_init__(self) -> None:
        faults = FaultList()
        _check_spans(self.spans, faults)
        if len(self.supports) != len(self.spans) + 1:
            faults.add(
                f"supports: {len(self.supports)} given for {len(self.spans)} spans; write "
                f"{len(self.spans) + 1}, Support('free') at the end of a cantilever"
            )
        else:
            _check_supports(self.supports, faults)
            _check_widths(self, faults)
        faults.raise_if_any()

    @property
    def axes(self) -> tuple[float, ...]:
        """Distances of the supports from the left end [mm]."""
        axes = [0.0]
        for span in self.spans:
            axes.append(axes[-1] + span.length)
        return tuple(axes)

    def faces(self, span: int) -> tuple[float, float]:
        """Return where the clear length of span number ``span`` starts and ends in it [mm]."""
        left, right = self.supports[span - 1 : span + 1]
        return left.half, self.spans[span - 1].length - right.half

    def clear(self, span: int) -> float:
        """Return the clear length of span number ``span`` [mm]."""
        start, end = self.faces(span)
        return end - start

    def cantilever(self, span: int) -> bool:
        """Whether span number ``span`` is an end span with a free outer end."""
        return any(s.kind == "free" for s in self.supports[span - 1 : span + 1])


def _check_positive(faults: FaultList, name: str, value: float, unit: str) -> bool:
    good = math.isfinite(value) and value > 0
    if not good:
        faults.add(f"{name} {value:g} {unit}; write a positive value")
    return good


def _check_spans(spans: Sequence[Span], faults: FaultList) -> None:
    if not 1 <= len(spans) <= MOST_SPANS:
        faults.add(f"spans: {len(spans)} given; write 1 to {MOST_SPANS} spans")
    stiffnesses = []
    for number, span in enumerate(spans, start=1):
        if not LEAST_SPAN <= span.length <= MOST_SPAN:
            faults.add(
                f"span {number}: length {span.length:g} mm is outside {LEAST_SPAN:g} to "
                f"{MOST_SPAN:g} mm; write the distance between support axes in mm"
            )
        if _check_positive(faults, f"span {number}: EI", span.EI, "N.mm2"):
            stiffnesses.append(span.EI)
    if stiffnesses and max(stiffnesses) > MOST_EI_RATIO * min(stiffnesses):
        faults.add(
            f"spans: EI from {min(stiffnesses):.3g} to {max(stiffnesses):.3g} N.mm2, more than "
            f"{MOST_EI_RATIO:g} times apart; write every EI in N.mm2"
        )


def _check_supports(supports: Sequence[Support], faults: FaultList) -> None:
    last = len(supports)
    for number, support in enumerate(supports, start=1):
        if support.kind not in KINDS:
            faults.add(f"support {number}: {support.kind!r}; write one of {', '.join(KINDS)}")
        elif support.kind == "free" and number not in (1, last):
            faults.add(
                f"support {number}: 'free' between two spans; only the ends can be free, join "
                "the two spans into one"
            )
        if support.kind == "elastic":
            _check_positive(faults, f"support {number}: stiffness", support.stiffness, "N.mm")
        elif support.stiffness != 0:
            faults.add(
                f"support {number}: stiffness {support.stiffness:g} N.mm given, but the support is "
                f"{support.kind}; write 'elastic'"
            )
    _check_stability(supports, faults)


def _check_stability(supports: Sequence[Support], faults: FaultList) -> None:
    held = [number for number, s in enumerate(supports, start=1) if s.kind != "free"]
    if not held:
        faults.add("supports: the beam is unstable: it has no support; both its ends are free")
    elif len(held) == 1 and supports[held[0] - 1].kind == "simple":
        faults.add(
            f"supports: the beam is unstable: it turns about support {held[0]}, its only support, "
            "which is simple; write ', fixed' behind it, or add a support"
        )


def _check_widths(beam: Beam, faults: FaultList) -> None:
    bad = set()
    for number, support in enumerate(beam.supports, start=1):
        if not (math.isfinite(support.width) and support.width >= 0):
            faults.add(f"support {number}: width {support.width:g} mm; write zero or more")
            bad.add(number)
        elif support.kind == "free" and support.width > 0:
            faults.add(f"support {number}: a free end has no width; leave it out")
            bad.add(number)
    for number, (left, right) in enumerate(pairwise(beam.supports), start=1):
        length = beam.spans[number - 1].length
        if bad & {number, number + 1} or not length > 0:
            continue
        for at, support in ((number, left), (number + 1, right)):
            if support.width > length:
                faults.add(
                    f"support {at}: width {support.width:g} mm is wider than span {number} of "
                    f"{length:g} mm; write a smaller width"
                )
        if max(left.width, right.width) <= length <= left.half + right.half:
            faults.add(f"span {number}: supports {number} and {number + 1} leave no clear length")


def check_loads(beam: Beam, loads: Iterable[Load]) -> tuple[Load, ...]:
    """Return the loads if each lies inside its span; raises :class:`UserError` with all faults."""
    faults = FaultList()
    kept = tuple(loads)
    for number, load in enumerate(kept, start=1):
        _check_load(beam, load, f"load {number} ({load.kind or 'no type'})", faults)
    if not kept:
        faults.add("loads: none given; write at least the dead load")
    faults.raise_if_any()
    return kept


def _check_load(beam: Beam, load: Load, name: str, faults: FaultList) -> None:
    if not load.kind.isidentifier():
        faults.add(f"{name}: load type {load.kind!r}; write a letter such as 'D' or 'L'")
    size = load.P if isinstance(load, PointLoad) else load.w
    if not math.isfinite(size):
        faults.add(f"{name}: size {size:g}; write a finite number")
    if not 1 <= load.span <= len(beam.spans):
        faults.add(f"{name}: span {load.span} does not exist; the beam has {len(beam.spans)}")
        return
    length = beam.spans[load.span - 1].length
    if isinstance(load, PointLoad) and not 0 <= load.at <= length:
        faults.add(
            f"{name}: at {load.at:g} mm is outside span {load.span} of {length:g} mm; write a "
            "distance from the left end of the span"
        )
    if isinstance(load, PartialLoad) and not 0 <= load.start < load.end <= length:
        faults.add(
            f"{name}: from {load.start:g} to {load.end:g} mm is not inside span {load.span} of "
            f"{length:g} mm; write 0 <= start < end <= length"
        )
