"""Shear where flange and web meet: what one overhang takes, and the bars of the slab across it."""

from __future__ import annotations

import re
from dataclasses import dataclass

import numpy as np

from lineproof.beams.continuous.forces import Forces
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.formula import FROM_MEMORY
from lineproof.quantity import echo, read_quantity
from lineproof.standards.a23_3 import bars, interface

NOT_COVERED = {"check": "Shear between flange and web", "clause": "11.5"}
"""What is said where the bars of the slab are not given."""
_SLAB_BARS = re.compile(
    r"\s*(?:(?P<layers>[12])\s*x\s*)?(?P<size>\d\dM)\s+at\s+(?P<spacing>.+?)\s*\Z", re.IGNORECASE
)
_NOTE = (
    "Counted are only transverse bars of the slab that its own bending does not need there; they "
    "reach past the web and into the overhang by their development length."
)


@dataclass(frozen=True, slots=True)
class SlabBars:
    """Transverse bars of the slab across the plane: layers, size, spacing [mm]."""

    layers: int
    size: str
    spacing: float

    def __str__(self) -> str:
        layers = "" if self.layers == 1 else f"{self.layers} x "
        return f"{layers}{self.size} at {self.spacing:g} mm"


def read_slab_bars(name: str, text: object) -> SlabBars:
    """Read the transverse bars of the slab; raises :class:`UserError` that says how to write them.

    >>> str(read_slab_bars("slab_bars", "2 x 10M at 250 mm"))
    '2 x 10M at 250 mm'
    """
    match = _SLAB_BARS.match(str(text))
    if match is None:
        raise UserError(
            f"{name}: {echo(text)} is not understood; write '10M at 250 mm', or "
            "'2 x 10M at 250 mm' for a layer at the top and one at the bottom of the slab"
        )
    size = match["size"].upper()
    bars.BARS.row(size, name)
    spacing = read_quantity(name, match["spacing"], "mm").value
    if not 0 < spacing <= 500:  # noqa: PLR2004 - wider bars do not act together
        raise UserError(
            f"{name}: {echo(text)} has a spacing outside 0 to 500 mm; write '10M at 250 mm'"
        )
    return SlabBars(int(match["layers"] or 1), size, spacing)


def length_beside_sag(forces: Forces, span: int) -> float:
    """Return the shorter distance from the largest sagging moment of a span to a zero moment [mm].

    Of the case that has the largest moment; the force of the flange enters over this length.
    """
    most = forces.sag(span)
    curves = forces.solved.solution.span(span)
    start, end = forces.beam.faces(span)
    zeros = np.array([start, *curves.inflections(most.row), end])
    left, right = zeros[zeros < most.x], zeros[zeros > most.x]
    lengths = [most.x - left.max()] if len(left) else []
    lengths += [right.min() - most.x] if len(right) else []
    if not lengths:
        raise UserError(f"span {span}: its largest moment has no length beside it")
    return float(min(lengths))


def record_interface(steps: Steps, slab: SlabBars, length: float, *, block_in_web: bool) -> None:
    """Record inside the open part the plane between flange and web in sagging moment.

    Needs ``A_s`` (bottom bars), ``b`` (flange), b_o, b_w and h_f in place, and C_f where the stress
    block reaches into the web. ``length`` [mm] is that of :func:`length_beside_sag`. The bars are
    taken at yield.
    """
    steps.line(interface.OVERHANG_BLOCK_IN_WEB if block_in_web else interface.OVERHANG_IN_FLANGE)
    _record_plane(steps, slab, length)


def record_interface_top(steps: Steps, slab: SlabBars, length: float) -> None:
    """Record inside the open part the same for top bars that lie in the overhang.

    Needs n_o, ``A_b`` of the top bars and h_f in place; ``length`` [mm] runs from the face of the
    support to the point of inflection.
    """
    steps.line(interface.OVERHANG_TENSION)
    _record_plane(steps, slab, length)


def _record_plane(steps: Steps, slab: SlabBars, length: float) -> None:
    sheet = steps.sheet
    sheet.note("slab-bars", _NOTE, title=f"Slab: {slab}", clause="11.5", basis=FROM_MEMORY)
    l_vf = sheet.given(
        "l_vf", f"{length / 1000:.6g} m", source="largest moment to zero moment, shorter side"
    )
    steps.bind(
        l_vf=l_vf,
        n_f=sheet.given("n_f", str(slab.layers)),
        s_f=sheet.given("s_f", f"{slab.spacing:.12g} mm"),
        A_b=sheet.lookup("A_b", bars.BARS, slab.size),
        c_v=sheet.lookup("c_v", interface.SURFACES, "monolithic"),
        mu=sheet.lookup("mu", interface.SURFACES, "monolithic"),
    )
    steps.lines(interface.STRESS, interface.BARS_ACROSS, interface.RATIO_FLANGE)
    steps.lines(interface.COMPRESSION, interface.RESISTANCE)
    steps.check(interface.STRENGTH)
