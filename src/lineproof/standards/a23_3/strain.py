"""Strain compatibility: the second path that proves every closed-form resistance.

Plane sections, eps_cu at the top, the concrete in thin strips, every layer of bars at its own
strain; the neutral axis by bisection on equilibrium. Written apart from the closed forms on
purpose: it shares no formula with them but the stress block itself.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import partial
from itertools import pairwise

from lineproof.errors import UserError
from lineproof.formula import Criterion, criterion
from lineproof.record import Procedure, procedure
from lineproof.standards.a23_3.notation import NOTATION
from lineproof.standards.references import MECHANICS

_criterion = partial(criterion, notation=NOTATION)

STRIPS = 100
PEAK_OF_PARABOLA = 0.9
STRAIN_AT_PEAK = 0.002
PARABOLA = (
    "The stress in the concrete follows a second-degree parabola from zero to a peak of 0.9 times "
    "the factored strength at a strain of 0.002 and stays constant from there to the strain at "
    "crushing; the bars are elastic up to their factored yield strength, then constant."
)
_STEPS = 200


@dataclass(frozen=True, slots=True)
class Layer:
    """Bars at one depth from the compression face: depth [mm] and area [mm2]."""

    depth: float
    area: float


@dataclass(frozen=True, slots=True)
class Section:
    """A T section in bending, compression at the top; a rectangle has ``b == b_w`` [mm]."""

    b: float
    b_w: float
    h_f: float

    def width(self, depth: float) -> float:
        """Return the width at a depth below the compression face [mm]."""
        return self.b if depth < self.h_f else self.b_w


@dataclass(frozen=True, slots=True)
class Steel:
    """Elastic, perfectly plastic bars: E_s [MPa], f_y [MPa], resistance factor."""

    E_s: float
    f_y: float
    phi_s: float

    def stress(self, strain: float) -> float:
        """Return the factored stress at a strain, tension positive [MPa]."""
        return self.phi_s * max(-self.f_y, min(self.f_y, self.E_s * strain))


Strips = Callable[[float], list[tuple[float, float]]]
"""For a depth of the neutral axis: (compressive force [N], depth [mm]) of each strip."""


def block_strips(section: Section, stress: float, beta_1: float) -> Strips:
    """Return the strips of a rectangular block of that stress [MPa] and depth beta_1 c."""

    def strips(c: float) -> list[tuple[float, float]]:
        return [
            (stress * section.width(depth) * thickness, depth)
            for depth, thickness in _cuts(section, beta_1 * c)
        ]

    return strips


def parabola_stress(strain: float, peak: float, strain_at_peak: float) -> float:
    """Return the stress of a parabola up to ``peak`` [MPa], constant beyond its strain."""
    share = min(strain / strain_at_peak, 1.0)
    return peak * (2 * share - share * share)


def parabola_strips(section: Section, peak: float, strain_at_peak: float, eps_cu: float) -> Strips:
    """Return the strips of a parabola up to ``peak`` [MPa]."""

    def stress(depth: float, c: float) -> float:
        return parabola_stress(eps_cu * (1 - depth / c), peak, strain_at_peak)

    def strips(c: float) -> list[tuple[float, float]]:
        return [
            (stress(depth, c) * section.width(depth) * thickness, depth)
            for depth, thickness in _cuts(section, c)
        ]

    return strips


def _cuts(section: Section, bottom: float) -> list[tuple[float, float]]:
    """Cut the depth into strips, none of them across the underside of the flange."""
    edges = [0.0, min(section.h_f, bottom), bottom]
    cuts = []
    for top, end in pairwise(edges):
        thickness = (end - top) / STRIPS
        if thickness > 0:
            cuts += [(top + (i + 0.5) * thickness, thickness) for i in range(STRIPS)]
    return cuts


def neutral_axis(
    strips: Strips, layers: list[Layer], steel: Steel, eps_cu: float, displaced: float = 0.0
) -> float:
    """Return the depth of the neutral axis [mm] at which forces balance.

    ``displaced`` is the concrete stress taken off bars inside the compression zone [MPa].
    """
    low, high = 1e-3, 5 * max(layer.depth for layer in layers)
    if _unbalanced(strips, layers, steel, eps_cu, displaced, high) < 0:
        raise UserError("strain compatibility: no neutral axis inside the section; check the bars")
    for _ in range(_STEPS):
        middle = (low + high) / 2
        if middle in (low, high):
            break
        if _unbalanced(strips, layers, steel, eps_cu, displaced, middle) > 0:
            high = middle
        else:
            low = middle
    return (low + high) / 2


def _bar_force(layer: Layer, steel: Steel, eps_cu: float, displaced: float, c: float) -> float:
    """Return the force of a layer, tension positive [N]."""
    strain = eps_cu * (layer.depth - c) / c
    relief = displaced if strain < 0 else 0.0
    return layer.area * (steel.stress(strain) + relief)


def _unbalanced(
    strips: Strips, layers: list[Layer], steel: Steel, eps_cu: float, displaced: float, c: float
) -> float:
    tension = sum(_bar_force(layer, steel, eps_cu, displaced, c) for layer in layers)
    return sum(force for force, _ in strips(c)) - tension


def moment(
    strips: Strips, layers: list[Layer], steel: Steel, eps_cu: float, c: float, displaced: float = 0
) -> float:
    """Return the moment of all forces about the compression face [N.mm]."""
    concrete = sum(force * depth for force, depth in strips(c))
    bars = sum(_bar_force(x, steel, eps_cu, displaced, c) * x.depth for x in layers)
    return bars - concrete


_CONCRETE = ("alpha_1", "beta_1", "phi_c", "f_c", "eps_cu")
_STEEL = ("phi_s", "f_y", "E_s")
ZONES = {"tee": ("b", "b_w", "h_f"), "rectangle": ("b",)}
"""Compression zones and the symbols of their sizes."""
CASES = {
    "one layer": ("A_s", "d"),
    "two layers": ("A_s1", "d_1", "A_s2", "d_2"),
    "compression bars": ("A_s", "d", "A_sp", "d_p"),
    "compression bars, two layers": ("A_s1", "d_1", "A_s2", "d_2", "A_sp", "d_p"),
}
"""Arrangements of bars and the symbols of their areas and depths."""
_ANY_DEPTH = 1e9


def _whole(zone: str, function: Callable[..., float]) -> Callable[..., float]:
    """Let a rectangle be a T whose flange never ends."""
    if zone == "tee":
        return function

    def rectangle(*args: float, **settings: float) -> float:
        b = args[len(_CONCRETE)]
        before, after = args[: len(_CONCRETE)], args[len(_CONCRETE) + 1 :]
        return function(*before, b, b, _ANY_DEPTH, *after, **settings)

    return rectangle


def _case(args: tuple[float, ...]) -> tuple[Section, list[Layer], Steel]:
    b, b_w, h_f, phi_s, f_y, E_s, *bars = args[len(_CONCRETE) :]
    layers = [Layer(depth, area) for area, depth in zip(bars[::2], bars[1::2], strict=True)]
    return Section(b, b_w, h_f), layers, Steel(E_s, f_y, phi_s)


def _axis_by_block(*args: float) -> float:
    alpha_1, beta_1, phi_c, f_c, eps_cu = args[:5]
    section, layers, steel = _case(args)
    block = alpha_1 * phi_c * f_c
    return neutral_axis(block_strips(section, block, beta_1), layers, steel, eps_cu, block)


def _moment_by_block(*args: float) -> float:
    alpha_1, beta_1, phi_c, f_c, eps_cu = args[:5]
    section, layers, steel = _case(args)
    block = alpha_1 * phi_c * f_c
    strips = block_strips(section, block, beta_1)
    return moment(strips, layers, steel, eps_cu, _axis_by_block(*args), block)


def _axis_by_parabola(*args: float, peak: float, strain_at_peak: float) -> float:
    phi_c, f_c, eps_cu = args[2:5]
    section, layers, steel = _case(args)
    strips = parabola_strips(section, peak * phi_c * f_c, strain_at_peak, eps_cu)
    return neutral_axis(strips, layers, steel, eps_cu)


def _moment_by_parabola(*args: float, peak: float, strain_at_peak: float) -> float:
    phi_c, f_c, eps_cu = args[2:5]
    section, layers, steel = _case(args)
    strips = parabola_strips(section, peak * phi_c * f_c, strain_at_peak, eps_cu)
    axis = neutral_axis(strips, layers, steel, eps_cu)
    return moment(strips, layers, steel, eps_cu, axis)


PARABOLA_SETTINGS = {"peak": PEAK_OF_PARABOLA, "strain_at_peak": STRAIN_AT_PEAK}

Key = tuple[str, str]
"""Zone and case of a procedure."""


def _register(what: str, title: str, function: Callable[..., float]) -> dict[Key, Procedure]:
    return {
        (zone, case): procedure(
            f"{what}, {zone}, {case}", 1, title, (*_CONCRETE, *sizes, *_STEEL, *bars)
        )(_whole(zone, function))
        for zone, sizes in ZONES.items()
        for case, bars in CASES.items()
    }


AXIS = _register("neutral axis by layers", "bisection on equilibrium of layers", _axis_by_block)
MOMENT = _register("moment by layers", "moment of the layers about the top", _moment_by_block)
AXIS_PARABOLA = _register(
    "neutral axis by parabola", "bisection on equilibrium, parabolic curve", _axis_by_parabola
)
MOMENT_PARABOLA = _register(
    "moment by parabola", "moment of the layers about the top, parabolic curve", _moment_by_parabola
)


def _proved(M: str) -> Criterion:
    return _criterion(
        f"abs(M_l - {M}) <= 0.001*{M}",
        unit="kN.m",
        clause="10.1",
        title="Second path: layers and strains against the closed form",
        basis=MECHANICS,
        yes="Both paths give the same resistance within 0.1 %.",
        no="The two paths DISAGREE by more than 0.1 %: the closed form does not hold here.",
        key="second-path",
        proof=True,
    )


PROVED = _proved("M_r")
PROVED_BALANCED = _proved("M_rb")

CRITERIA = (PROVED, PROVED_BALANCED)
