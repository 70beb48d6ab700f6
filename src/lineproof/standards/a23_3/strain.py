"""Strain compatibility: the second path that proves every closed-form resistance.

Plane sections, eps_cu at the top, the concrete in thin strips, every layer of bars at its own
strain; the neutral axis as the root of equilibrium. Written apart from the closed forms on
purpose: it shares no formula with them but the stress block itself.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import lru_cache, partial

import numpy as np
from numpy.typing import NDArray

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
_STEPS = 400
_CLOSE = 1e-14
"""Part of its own size within which the axis is found."""
_LEAST = 1e-3
"""Depth of the axis from which on it is sought [mm]."""


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


@dataclass(frozen=True, slots=True)
class Steel:
    """Elastic, perfectly plastic bars: E_s [MPa], f_y [MPa], resistance factor."""

    E_s: float
    f_y: float
    phi_s: float

    def stress(self, strain: float) -> float:
        """Return the factored stress at a strain, tension positive [MPa]."""
        return self.phi_s * max(-self.f_y, min(self.f_y, self.E_s * strain))


Floats = NDArray[np.float64]
Strips = Callable[[float], tuple[Floats, Floats]]
"""For a depth of the neutral axis: compressive force [N] and depth [mm] of every strip."""

_MIDDLES = (np.arange(STRIPS) + 0.5) / STRIPS
"""Middles of the strips of a zone, as parts of its height."""


def block_strips(section: Section, stress: float, beta_1: float) -> Strips:
    """Return the strips of a rectangular block of that stress [MPa] and depth beta_1 c."""

    def strips(c: float) -> tuple[Floats, Floats]:
        depths, areas = _cuts(section, beta_1 * c)
        return stress * areas, depths

    return strips


def parabola_stress(strain: float, peak: float, strain_at_peak: float) -> float:
    """Return the stress of a parabola up to ``peak`` [MPa], constant beyond its strain."""
    share = min(strain / strain_at_peak, 1.0)
    return peak * (2 * share - share * share)


def parabola_strips(section: Section, peak: float, strain_at_peak: float, eps_cu: float) -> Strips:
    """Return the strips of a parabola up to ``peak`` [MPa]."""

    def strips(c: float) -> tuple[Floats, Floats]:
        depths, areas = _cuts(section, c)
        share = np.minimum(eps_cu * (1 - depths / c) / strain_at_peak, 1.0)
        return peak * (2 * share - share * share) * areas, depths

    return strips


def _cuts(section: Section, bottom: float) -> tuple[Floats, Floats]:
    """Cut the depth into strips, none across the underside of the flange: depths and areas."""
    flange = min(section.h_f, bottom)
    below = bottom - flange
    if below <= 0:
        return flange * _MIDDLES, np.full(STRIPS, section.b * flange / STRIPS)
    depths = np.concatenate([flange * _MIDDLES, flange + below * _MIDDLES])
    areas = np.repeat([section.b * flange / STRIPS, section.b_w * below / STRIPS], STRIPS)
    return depths, areas


def neutral_axis(
    strips: Strips, layers: list[Layer], steel: Steel, eps_cu: float, displaced: float = 0.0
) -> float:
    """Return the depth of the neutral axis [mm] at which forces balance; the least such depth.

    ``displaced`` is the concrete stress taken off bars inside the compression zone [MPa]. With it
    forces may balance a second time just below a layer. Raises :class:`UserError` where they
    balance nowhere.
    """
    depths = sorted(layer.depth for layer in layers)

    def unbalanced(c: float) -> float:
        return _unbalanced(strips, layers, steel, eps_cu, displaced, c)

    low = _LEAST
    for high in (*depths, 5 * depths[-1]):
        if unbalanced(high) >= 0:
            return _root(unbalanced, low, high)
        low = high
    raise UserError("strain compatibility: no neutral axis inside the section; check the bars")


def _root(function: Callable[[float], float], low: float, high: float) -> float:
    """Return where a function that rises from below zero at ``low`` is zero.

    False position; the value of an end that stays twice is halved. Every fourth step halves the
    interval, so that it closes whatever the shape.
    """
    f_low, f_high, moved = function(low), function(high), ""
    for step in range(_STEPS):
        middle = (low * f_high - high * f_low) / (f_high - f_low) if f_high != f_low else low
        # Beside an end that is the root already the other one comes as near as it must.
        middle = min(max(middle, low + _CLOSE * high / 2), high - _CLOSE * high / 2)
        if step % 4 == 3 or not low < middle < high:
            middle = (low + high) / 2
        if middle in (low, high) or high - low <= _CLOSE * high:
            break
        found = function(middle)
        if found == 0:
            return middle
        if found > 0:
            f_low = f_low / 2 if moved == "high" else f_low
            high, f_high, moved = middle, found, "high"
        else:
            f_high = f_high / 2 if moved == "low" else f_high
            low, f_low, moved = middle, found, "low"
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
    return float(strips(c)[0].sum()) - tension


def moment(
    strips: Strips, layers: list[Layer], steel: Steel, eps_cu: float, c: float, displaced: float = 0
) -> float:
    """Return the moment of all forces about the compression face [N.mm]."""
    forces, depths = strips(c)
    concrete = float(forces @ depths)
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


@lru_cache(maxsize=256)
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


@lru_cache(maxsize=256)
def _axis_by_parabola(*args: float, peak: float, strain_at_peak: float) -> float:
    phi_c, f_c, eps_cu = args[2:5]
    section, layers, steel = _case(args)
    strips = parabola_strips(section, peak * phi_c * f_c, strain_at_peak, eps_cu)
    return neutral_axis(strips, layers, steel, eps_cu)


def _moment_by_parabola(*args: float, peak: float, strain_at_peak: float) -> float:
    phi_c, f_c, eps_cu = args[2:5]
    section, layers, steel = _case(args)
    strips = parabola_strips(section, peak * phi_c * f_c, strain_at_peak, eps_cu)
    axis = _axis_by_parabola(*args, peak=peak, strain_at_peak=strain_at_peak)
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


AXIS = _register("neutral axis by layers", "root of equilibrium of layers", _axis_by_block)
MOMENT = _register("moment by layers", "moment of the layers about the top", _moment_by_block)
AXIS_PARABOLA = _register(
    "neutral axis by parabola", "root of equilibrium, parabolic curve", _axis_by_parabola
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
