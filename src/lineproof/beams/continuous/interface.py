"""Shear where flange and web meet: what one overhang takes, and the bars of the slab across it."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from lineproof.beams.analysis.curves import Curves
from lineproof.beams.bars import refuse_other_bars
from lineproof.beams.continuous.forces import Demand, End, Forces
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.formula import FROM_MEMORY
from lineproof.quantity import echo, read_quantity
from lineproof.standards.a23_3 import bars, interface
from lineproof.standards.references import MECHANICS

NOT_COVERED = {"check": "Shear between flange and web", "clause": "11.5"}
"""What is said where the bars of the slab are not given."""
LEAST_SPACING, MOST_SPACING = 50.0, 500.0
"""Spacing of bars of the slab [mm]: closer ones leave no way for concrete, wider ones act apart."""
POINT_LOAD = 1000.0
"""Change of shear at a place that is a point load [N]; less is what rounding of a file leaves."""
_FOUND = "found along the span"
_LAST_BIT = 1e-6
"""Distance [mm] that is not rounded down to a whole mm: 2799.999999 is 2800."""
_SLAB_BARS = re.compile(
    r"\s*(?:(?P<layers>[12])\s*x\s*)?(?P<size>\d\dM)\s+at\s+(?P<spacing>.+?)\s*\Z", re.IGNORECASE
)
_NOTE = (
    "Counted are only transverse bars of the slab that its own bending does not need there; they "
    "reach past the web and into the overhang by their development length."
)
_RESTRAINED = (
    "The assumed moment of restraint, wℓ²/n, decreases by the shear at the end, wℓ/2: it is zero "
    "2ℓ/n from the axis of the support."
)


@dataclass(frozen=True, slots=True)
class SlabBars:
    """Transverse bars of the slab across the plane: layers, size, spacing [mm]."""

    layers: int
    size: str
    spacing: float

    def __str__(self) -> str:
        layers = "" if self.layers == 1 else f"{self.layers} × "
        return f"{layers}{self.size} at {self.spacing:g} mm"


def read_slab_bars(name: str, text: object) -> SlabBars:
    """Read the transverse bars of the slab; raises :class:`UserError` that says how to write them.

    >>> str(read_slab_bars("slab_bars", "2 x 10M at 250 mm"))
    '2 × 10M at 250 mm'
    """
    refuse_other_bars(name, text)
    match = _SLAB_BARS.match(str(text))
    if match is None:
        raise UserError(
            f"{name}: {echo(text)} is not understood; write '10M at 250 mm', or "
            "'2 x 10M at 250 mm' for a layer at the top and one at the bottom of the slab"
        )
    size = match["size"].upper()
    bars.BARS.row(size, name)
    spacing = read_quantity(name, match["spacing"], "mm").value
    if not LEAST_SPACING <= spacing <= MOST_SPACING:
        raise UserError(
            f"{name}: {echo(text)} has a spacing outside {LEAST_SPACING:g} to {MOST_SPACING:g} mm; "
            "write '10M at 250 mm'"
        )
    return SlabBars(int(match["layers"] or 1), size, spacing)


@dataclass(frozen=True, slots=True)
class Beside:
    """The largest moment of a load case and its zero beside it, from the left axis [mm].

    ``zero`` is None where the moment is zero nowhere in the span; ``where`` tells how it was found:
    at the face of a support it is taken as zero, where the moment does not change its sign before.
    Between point loads the moment falls at other rates: ``zero`` is where it would be zero if it
    fell at the steepest all the way.
    """

    at: float
    zero: float | None
    case: str
    where: str = _FOUND


def beside_sag(forces: Forces, span: int) -> Beside:
    """Return the largest sagging moment of a span and the nearer of the places of zero moment.

    Both are of the case that has the largest moment; the force of the flange enters over the
    length between them, where point loads stand between as fast as where it does so fastest.
    """
    most = forces.sag(span)
    curves = forces.solved.solution.span(span)
    faces = forces.beam.faces(span)
    zeros = np.array([faces[0], *curves.inflections(most.row), faces[1]])
    left, right = zeros[zeros < most.x], zeros[zeros > most.x]
    found = [float(side) for side in (*left[-1:], *right[:1])]
    if not found:
        raise UserError(f"span {span}: its largest moment has no length beside it")
    made = [
        _steepest(curves, most, zero, "face of the support" if zero in faces else _FOUND)
        for zero in found
    ]
    return min(made, key=lambda each: abs(most.x - (each.zero or 0.0)))


def beside_hog(forces: Forces, support: int, side: End) -> Beside:
    """Return the largest moment of a face of a support and the nearest place of zero moment.

    At a free end the moment is zero, whatever the last bits of its sum say.
    """
    demand = forces.hog(support, side)
    curves = forces.solved.solution.span(demand.span)
    zeros = curves.inflections(demand.row)
    start, end = forces.beam.faces(demand.span)
    free = _free_end(forces, demand.span)
    inside = [float(x) for x in zeros if start < x < end and (free is None or abs(x - free) >= 1)]
    zero = min(inside, key=lambda x: abs(x - demand.x), default=free)
    if zero is None:
        return Beside(demand.x, None, str(demand.case))
    return _steepest(curves, demand, zero, "free end" if zero == free else _FOUND)


def _steepest(curves: Curves, demand: Demand, zero: float, where: str) -> Beside:
    """Return the zero of a moment that falls as fast all the way as between two point loads.

    The least length that leaves: of one piece without point loads inside, the length itself.
    """
    row, low, high = demand.row, *sorted((demand.x, zero))
    heavy = np.abs(curves.P[row]) >= POINT_LOAD
    inside = [x for x in curves.breaks[heavy].tolist() if low + 1 < x < high - 1]
    places = sorted([demand.x, *inside, zero], key=lambda x: abs(x - demand.x))
    M = np.abs(curves.moment(np.array(places))[row])
    falls = [((M[n] - M[n + 1]) / abs(b - a), a, b) for n, (a, b) in enumerate(pairwise(places))]
    rate, a, b = max(falls)
    if len(falls) == 1 or rate * abs(zero - demand.x) <= M[0]:
        return Beside(demand.x, zero, str(demand.case), where)
    reached = demand.x + math.copysign(float(M[0] / rate), zero - demand.x)
    told = f"zero if it fell all the way as from {a / 1000:.2f} to {b / 1000:.2f} m"
    return Beside(demand.x, reached, str(demand.case), told)


def _free_end(forces: Forces, span: int) -> float | None:
    """Return where a span ends free, from its left axis [mm]."""
    left, right = forces.beam.supports[span - 1 : span + 1]
    length = forces.beam.spans[span - 1].length
    return 0.0 if left.kind == "free" else length if right.kind == "free" else None


def record_length(steps: Steps, beside: Beside) -> None:
    """Record inside the open part the length l_vf over which the force enters, and bind it.

    From places on whole mm, the zero rounded towards the moment: to the safe side. Needs l_n where
    the moment is zero nowhere.
    """
    sheet = steps.sheet
    if beside.zero is None:
        steps.line(interface.LENGTH_QUARTER)
        return
    at = float(round(beside.at))
    bit = _LAST_BIT if beside.zero > at else -_LAST_BIT
    zero = math.floor(beside.zero + bit) if beside.zero > at else math.ceil(beside.zero + bit)
    steps.bind(
        x_vm=sheet.given("x_vm", f"{at:.12g} mm", source=f"found along the span, {beside.case}"),
        x_vz=sheet.given("x_vz", f"{zero:.12g} mm", source=f"{beside.where}, {beside.case}"),
    )
    steps.line(interface.LENGTH)


def record_restrained_length(steps: Steps, share: float) -> None:
    """Record inside the open part the length l_vf at an end with an assumed restraint; bind it.

    The moment w l^2/n falls off by the shear w l/2: it is zero 2 l/n from the axis. ``share`` is n.
    Needs ``l`` and b_sp.
    """
    sheet = steps.sheet
    sheet.note("restraint-length", _RESTRAINED, title="Length", basis=MECHANICS)
    steps.bind(n_rm=sheet.given("n_rm", f"{share:g}", source="coefficient of the restraint"))
    steps.line(interface.LENGTH_RESTRAINED)


def record_interface(steps: Steps, slab: SlabBars, *, block_in_web: bool) -> None:
    """Record inside the open part the plane between flange and web where the moment is positive.

    Needs ``A_s`` (bottom bars), ``b`` (flange), b_o, b_w, h_f and l_vf in place, and C_f where the
    stress block reaches into the web. The bars are taken at yield.
    """
    steps.line(interface.OVERHANG_BLOCK_IN_WEB if block_in_web else interface.OVERHANG_IN_FLANGE)
    _record_plane(steps, slab)


def record_interface_top(steps: Steps, slab: SlabBars, *, in_part: bool) -> None:
    """Record inside the open part the same for top bars that lie in the overhang.

    Their tension follows the moment of the section, which is that of all its bars at yield at M_r;
    below it the lever arm is longer, so that they take less than their share. Needs n_o, ``A_b`` of
    the top bars, M_f, M_r, h_f and l_vf in place; l_av and l_d where those in the overhang count
    ``in_part`` at the face, as they do in M_r.
    """
    steps.line(interface.OVERHANG_TENSION_IN_PART if in_part else interface.OVERHANG_TENSION)
    _record_plane(steps, slab)


def _record_plane(steps: Steps, slab: SlabBars) -> None:
    sheet = steps.sheet
    sheet.note("slab-bars", _NOTE, title=f"Slab: {slab}", clause="11.5", basis=FROM_MEMORY)
    steps.bind(
        n_f=sheet.given("n_f", str(slab.layers)),
        s_f=sheet.given("s_f", f"{slab.spacing:.12g} mm"),
        A_b=sheet.lookup("A_b", bars.BARS, slab.size),
        c_v=sheet.lookup("c_v", interface.SURFACES, "monolithic"),
        mu=sheet.lookup("mu", interface.SURFACES, "monolithic"),
    )
    steps.lines(interface.STRESS, interface.BARS_ACROSS, interface.RATIO_FLANGE)
    steps.lines(interface.COMPRESSION, interface.RESISTANCE)
    steps.check(interface.STRENGTH)
