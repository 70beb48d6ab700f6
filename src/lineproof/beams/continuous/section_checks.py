"""The checks of bars at one section on plain numbers, for choosing bars and for cures.

The same catalogue formulas are recorded for the bars chosen: a choice never rests on a second,
shorter version of a formula.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from lineproof.beams.bars import BarLayer, BarLayers, TopBars, centre_of, of_one_size, spaced
from lineproof.beams.continuous.numbers import Numbers, holds, put, utilisation, value
from lineproof.beams.inputs import Shape
from lineproof.beams.section import SPREAD_AREAS, TENSION_WIDTHS
from lineproof.formula import Formula
from lineproof.standards.a23_3 import (
    bars,
    crack_control,
    deflection,
    development,
    flexure,
    minimum,
)
from lineproof.standards.a23_3.bars import BARS

Checks = dict[str, float]
"""Utilisation of each check by its key: at most 1 where it holds."""

TENSION_AREAS: Mapping[Shape, Formula] = {
    "T": crack_control.TENSION_AREA_T,
    "L": crack_control.TENSION_AREA_L,
    "rectangular": crack_control.TENSION_AREA,
}


@dataclass(frozen=True, slots=True)
class Rules:
    """Choices of the calculation that the checks of a section depend on."""

    shape: Shape
    minimum_rule: str
    waivable: bool = True


def _put_layer(at: Numbers, layer: BarLayer, stirrup: str) -> None:
    at["d_bs"] = BARS.number(stirrup, "d_b")
    at["r_s"] = bars.STIRRUP_BENDS.number(stirrup, "r_s")
    at["d_b"], at["A_b"] = layer.diameter, BARS.number(layer.size, "A_b")
    at["n_b"] = at["n_1"] = float(layer.count)


def _put_all(at: Numbers, groups: Iterable[tuple[float, float]]) -> None:
    """Put the area of bars of several sizes or layers, and the depth to their centre.

    ``groups`` gives area and depth of bars of one size in one layer.
    """
    at["A_s"], at["d"] = centre_of(groups)


def _first_groups(at: Numbers, layer: BarLayer) -> list[tuple[float, float]]:
    """Return area and depth of each size in a first layer."""
    return [
        (group.area, value(bars.DEPTH_ONE_LAYER, at | {"d_b": group.diameter}))
        for group in layer.groups
    ]


def _second_groups(at: Numbers, first: BarLayer, layer: BarLayer) -> list[tuple[float, float]]:
    """Return area and depth of each size in a second layer, over the first one."""
    made = []
    for group in layer.groups:
        thicker = max(first.diameter, group.diameter)
        s_l = value(bars.LAYER_DISTANCE, at | {"d_b": thicker})
        d_2 = value(bars.DEPTH_SECOND, at | {"d_b2": group.diameter, "s_l": s_l})
        made.append((group.area, d_2))
    return made


def put_bottom(at: Numbers, layers: BarLayers, stirrup: str) -> Checks:
    """Put bottom bars into the numbers: areas and depths; return whether they fit."""
    first = layers[0]
    _put_layer(at, first, stirrup)
    put(at, bars.LEAST_CLEAR)
    at["s_c"] = value(bars.CLEAR, at | {"n_b": float(spaced(first.count))})
    made = {bars.FITS.key: utilisation(bars.FITS, at)}
    if len(layers) == 1 and not of_one_size(layers):
        _put_all(at, _first_groups(at, first))
        return made
    if len(layers) == 1:
        put(at, bars.AREA_OF_BARS, bars.DEPTH_ONE_LAYER)
        return made
    second = layers[1]
    at["A_s1"] = value(bars.AREA_OF_BARS, at)
    put(at, bars.DEPTH_FIRST)
    made |= _put_above(at, first, second)
    at["A_s2"] = second.area
    put(at, bars.DEPTH_SECOND, bars.TOTAL_AREA, bars.DEPTH_TWO_LAYERS)
    if not of_one_size(layers):
        _put_all(at, [*_first_groups(at, first), *_second_groups(at, first, second)])
    return made


def _put_above(at: Numbers, first: BarLayer, second: BarLayer) -> Checks:
    """Put the distances of a second layer into the numbers; return whether it fits."""
    at["d_b2"] = second.diameter
    upper = at | {"d_b": second.diameter, "n_b": float(spaced(second.count))}
    at["s_min2"] = value(bars.LEAST_CLEAR, upper)
    at["s_c2"] = value(bars.CLEAR, upper)
    at["s_l"] = value(bars.LAYER_DISTANCE, at | {"d_b": max(first.diameter, second.diameter)})
    return {bars.FITS_SECOND.key: utilisation(bars.FITS_SECOND, at)}


def put_top(at: Numbers, shape: Shape, top: TopBars, stirrup: str) -> Checks:
    """Put top bars into the numbers, those within the web and those in the overhangs."""
    web = top.web
    _put_layer(at, web, stirrup)
    at["n_t"], at["n_o"] = float(web.count), float(top.overhang)
    at["s_c"] = value(bars.CLEAR, at | {"n_b": float(spaced(web.count))})
    put(at, bars.LEAST_CLEAR)
    made = {bars.FITS.key: utilisation(bars.FITS, at)}
    if top.upper is not None:
        put(at, bars.DEPTH_FIRST)
        made |= _put_above(at, web, top.upper)
        put(at, bars.DEPTH_SECOND)
    if top.of_one_size:
        put(at, SPREAD_AREAS[shape], bars.DEPTH_ONE_LAYER)
    else:
        first = [row for group in top.outer_groups for row in _first_groups(at, group)]
        above = [] if top.upper is None else _second_groups(at, web, top.upper)
        _put_all(at, [*first, *above])
    if shape != "rectangular":
        put(at, minimum.SPREAD_WIDTH, minimum.SPREAD_AREA)
        A_b = BARS.number(top.spread_size, "A_b")
        made[minimum.SPREAD.key] = utilisation(minimum.SPREAD, at | {"A_b": A_b})
        if top.overhang:
            made |= _beside_in_overhang(at, top.spread_size)
    return made


def _beside_in_overhang(at: Numbers, size: str) -> Checks:
    """Put the distances of the bars in an overhang into the numbers; return whether they fit."""
    beside = at | {"d_b": BARS.number(size, "d_b")}
    at["s_mino"] = value(bars.LEAST_CLEAR, beside)
    at["s_co"] = value(development.CLEAR_OVERHANG, beside)
    return {bars.FITS_OVERHANG.key: utilisation(bars.FITS_OVERHANG, at)}


def put_resistance(at: Numbers) -> float:
    """Put block, axis and resistance into the numbers; return M_r. ``h_f`` absent: a rectangle."""
    put(at, flexure.BLOCK_RECTANGULAR)
    if "h_f" not in at or holds(flexure.IN_FLANGE, at):
        put(at, flexure.NEUTRAL_AXIS)
        return put(at, flexure.M_R_RECTANGULAR)
    put(at, flexure.FLANGE_FORCE, flexure.BLOCK_IN_WEB, flexure.NEUTRAL_AXIS_IN_WEB)
    return put(at, flexure.M_R_TEE)


def _strength(at: Numbers) -> Checks:
    put_resistance(at)
    made = {
        flexure.STRENGTH.key: utilisation(flexure.STRENGTH, at),
        flexure.YIELDS.key: utilisation(flexure.YIELDS, at),
    }
    if "d_2" in at:
        made[flexure.UPPER_LAYER_YIELDS.key] = utilisation(flexure.UPPER_LAYER_YIELDS, at)
    return made


def _minimum(at: Numbers, rules: Rules, width: Formula, *, top: bool) -> Checks:
    if rules.minimum_rule == "10.5.1.1":
        test = minimum.BY_CRACKING_TOP if top else minimum.BY_CRACKING
    else:
        put(at, width, minimum.A_S_MIN)
        test = minimum.BY_AREA
    used = utilisation(test, at)
    if used > 1 and rules.waivable:
        used = min(used, utilisation(minimum.WAIVER, at))
    return {test.key: used}


def _cracks(at: Numbers, area: Formula, standing: float) -> Checks:
    """Return the check of cracks: ``standing`` bars [mm2] share them, those of ``at`` stretch.

    The stress is calculated from ``M_s``, where there is one, if the allowance does not do.
    """
    around = at | {"A_s": standing}
    put(around, crack_control.D_C, crack_control.D_S)
    put(around, crack_control.BAR_COUNT, area)
    if "M_s" in at and not holds(crack_control.ALLOWANCE_DOES, around):
        around["f_s"] = _stress(at)
    else:
        put(around, crack_control.STRESS_ALLOWANCE)
    put(around, crack_control.Z)
    return {crack_control.CRACKS.key: utilisation(crack_control.CRACKS, around)}


def _stress(at: Numbers) -> float:
    """Return the stress of the bars due to M_s, cracked section [MPa]."""
    own = dict(at)
    put(own, deflection.MODULAR_RATIO, deflection.AXIS)
    if own["b"] > own["b_w"] and not holds(deflection.AXIS_IN_FLANGE, own):
        own["kd"] = put(own, deflection.AXIS_IN_WEB)
        put(own, deflection.CRACKED_TEE)
    else:
        put(own, deflection.CRACKED)
    return value(crack_control.STRESS, own)


def bottom_checks(at: Numbers, rules: Rules, layers: BarLayers, stirrup: str) -> Checks:
    """Return every check of bottom bars at a section with the bottom in tension.

    ``at`` holds materials, geometry (b, b_w, h, h_f where there is a slab), M_f and M_cr.
    """
    made = put_bottom(at, layers, stirrup)
    made |= _strength(at)
    made |= _minimum(at, rules, minimum.WIDTH_WEB, top=False)
    largest = max(layers, key=lambda layer: layer.diameter)
    at["A_b"] = BARS.number(largest.size, "A_b")
    return made | _cracks(at, crack_control.TENSION_AREA, at["A_s"])


def top_checks(
    at: Numbers, rules: Rules, top: TopBars, stirrup: str, counted: float = 1.0
) -> Checks:
    """Return every check of top bars at a section with the top in tension: the web compressed.

    ``at`` holds materials, geometry (b_w, h, l, and b_f, b_o, h_f where there is a slab), M_f and
    M_crn. ``counted`` is the part of the area that the support anchors.
    """
    made = put_top(at, rules.shape, top, stirrup)
    standing = at["A_s"]
    at["A_s"] *= counted
    flange = at.pop("h_f", None)
    at["b"] = at["b_w"]
    made |= _strength(at)
    if flange is not None:
        at["h_f"] = flange
    made |= _minimum(at, rules, TENSION_WIDTHS[rules.shape], top=True)
    at["A_b"] = max(BARS.number(group.size, "A_b") for group in top.groups)
    return made | _cracks(at, TENSION_AREAS[rules.shape], standing)


def fails(checks: Checks) -> bool:
    """Tell whether a check does not hold."""
    return any(used > 1 for used in checks.values())
