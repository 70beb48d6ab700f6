"""Inputs that must go together: each fault names the input, what was given, what to type."""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import Any

from lineproof.beams.analysis.model import Beam, Span, Support
from lineproof.beams.analysis.redistribution import MOST, check_reductions
from lineproof.beams.continuous.typed_beam import (
    TypedSupport,
)
from lineproof.beams.inputs import (
    LEAST_NORMAL,
    SNOWED_ON,
    check_flange,
)
from lineproof.beams.steel import yield_strength
from lineproof.errors import FaultList, UserError
from lineproof.quantity import Typed
from lineproof.quantity.units import internal_factor

DEEPEST = 2.0
"""Clear span over depth below which a beam is deep (10.7)."""
SHORTEST = 1.0
"""Clear length over depth below which a cantilever is a bracket: half of a deep beam."""
SIMPLIFIED_UP_TO = 400.0, 60.0
"""Largest f_y and f_c of the simplified method [MPa] (11.3.6.3)."""
GRAVITY = 9.81e-3
"""Weight of 1 kg [kN]."""
STEEL = 1.0
"""What reinforcement adds to the weight of plain concrete [kN/m3], common practice."""
STORED = ("storage area", "equipment room", "library stack room")
"""Uses whose companion live load is larger (NBC 4.1.3.2)."""
USUAL_DENSITY = 2446.0
"""Largest density of plain concrete that weighs 24 kN/m3 or less [kg/m3]."""


def check_unit_weight(fields: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse a weight of reinforced concrete that does not go with the density of its concrete."""
    gamma_c, gamma_w = fields["gamma_c"], fields["gamma_w"]
    if gamma_c is None:
        return
    plain = gamma_c.value * GRAVITY
    likely = f"'{math.ceil(10 * (plain + STEEL)) / 10:g} kN/m3'"
    if gamma_w is not None:
        if gamma_w.value < plain * internal_factor("kN/m3"):
            faults.add(
                f"gamma_w: {gamma_w.text} is less than the {plain:.1f} kN/m3 of concrete of "
                f"{gamma_c.text} without steel; write for example {likely}"
            )
    elif not LEAST_NORMAL <= gamma_c.value <= USUAL_DENSITY:
        faults.add(
            f"gamma_w: concrete of {gamma_c.text} does not weigh the usual 24 kN/m3 with its "
            f"steel; write that of the reinforced concrete, for example gamma_w = {likely}"
        )


def check_slab(fields: Mapping[str, Any], given: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse a shape without the slab that it needs, and a slab that does not go with it."""
    check_flange(fields, given, faults)
    if fields["shape"] == "rectangular" and given["slab_bars"] is not None:
        faults.add("slab_bars: a rectangular beam has no flange; write slab_bars = None")


def check_bars_given(fields: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse bars given twice, once by section and once along the beam."""
    if fields.get("bar_runs") is None:
        return
    for name, each in (("bottom_bars", "span"), ("top_bars", "support")):
        rows = fields.get(name) or ()
        given = next(((n, bars) for n, bars in enumerate(rows, start=1) if bars is not None), None)
        if given is not None:
            shown = " / ".join(str(layer) for layer in given[1])
            faults.add(
                f"{name}: {shown} at {each} {given[0]} is given beside bar_runs, which hold all "
                f"bars; write {name} = None, or bar_runs = None"
            )


def check_method(fields: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse the simplified method of shear where it does not hold."""
    if fields["shear_method"] != "simplified" or None in (fields["grade"], fields["f_c"]):
        return
    f_y, f_c = yield_strength(fields["grade"]), fields["f_c"].value
    most_steel, most_concrete = SIMPLIFIED_UP_TO
    if f_y > most_steel:
        faults.add(
            f"shear_method: 'simplified' holds up to bars of {most_steel:g} MPa, but grade "
            f"{fields['grade']!r} has {f_y:g} MPa; write 'general'"
        )
    if f_c > most_concrete:
        faults.add(
            f"shear_method: 'simplified' holds up to concrete of {most_concrete:g} MPa, but f_c "
            f"is {fields['f_c'].text}; write 'general'"
        )


def check_torques(fields: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse torques of load types that the beam does not carry, and torsion without torques."""
    if fields["torsion"] == "equilibrium" and not fields["torques"] and not fields["forces_file"]:
        faults.add(
            "torsion: 'equilibrium' is given, but nothing turns the beam; write torques = {'D': "
            "'5.5 kN.m/m'}, or leave torsion out"
        )
    if fields["use"] is None or fields.get("loads") is None:
        return
    live = "L_st" if fields["use"] in STORED else "L"
    there = {"D", live} | {load.kind for load in fields["loads"]}
    there |= {"S"} if fields["snow"] is not None else set()
    for kind in fields["torques"]:
        if kind not in there:
            faults.add(
                f"torques: a torque by {kind}, but the beam has no load of that type (use "
                f"{fields['use']!r} gives {live}); write one of {', '.join(sorted(there))}, or the "
                "load that turns the beam as a load as well"
            )


def check_snow(fields: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse a use that carries snow without its snow load."""
    if fields["use"] in SNOWED_ON and fields["snow"] is None:
        faults.add(
            f"snow: a beam of use {fields['use']!r} carries snow; write the specified snow load, "
            "such as '1.6 kPa', or '0 kPa' under a roof"
        )


def check_construction(fields: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse a construction stage beside single live loads: deflections cannot scale those."""
    if fields["construction_load"] is None or fields["forces_file"] is not None:
        return
    single = [n for n, load in enumerate(fields.get("loads") or (), 1) if load.kind.startswith("L")]
    if single:
        faults.add(
            f"construction_load: {fields['construction_load'].text} cannot stand in the place of "
            f"single live loads (load {', '.join(str(n) for n in single)}); leave it out, or give "
            "them as dead load of a calculation of that stage"
        )


def check_proportions(fields: Mapping[str, Any], faults: FaultList) -> None:
    """Refuse beams that cannot stand, slabs thicker than the beam, and deep beams."""
    try:
        beam = _stand_in(fields)
        changes = fields["redistribution"]
        check_reductions(beam, changes, dict.fromkeys(changes, MOST))
    except UserError as error:
        faults.take(error)
    supports: tuple[TypedSupport, ...] = fields["supports"]
    h_f: Typed | None = fields["h_f"]
    halves = [0.0 if s.width is None else s.width.value / 2 for s in supports]
    for number, (length, depth) in enumerate(
        zip(fields["spans"], fields["depths"], strict=True), start=1
    ):
        if h_f is not None and h_f.value >= depth.value:
            faults.add(
                f"h_f: {h_f.text} is not less than h of {depth.text} in span {number}; write a "
                "thinner slab or a deeper beam"
            )
        clear = length.value - halves[number - 1] - halves[number]
        cantilever = "free" in (supports[number - 1].kind, supports[number].kind)
        if clear > 0:
            _check_depth(number, clear, depth, faults, cantilever=cantilever)


def _stand_in(fields: Mapping[str, Any]) -> Beam:
    """Return the beam with one stiffness throughout: whether it can stand shows with any."""
    supports: tuple[TypedSupport, ...] = fields["supports"]
    return Beam(
        tuple(Span(length.value, 1e13) for length in fields["spans"]),
        tuple(
            Support(s.kind, 0.0 if s.width is None else s.width.value, 1e9 * (s.kind == "elastic"))
            for s in supports
        ),
    )


def _check_depth(
    number: int, clear: float, depth: Typed, faults: FaultList, *, cantilever: bool
) -> None:
    if clear >= (SHORTEST if cantilever else DEEPEST) * depth.value:
        return
    limit, what = ("h", "so short a cantilever") if cantilever else ("twice h", "a deep beam")
    faults.add(
        f"span {number}: its clear length of {clear / 1000:g} m is less than {limit} of "
        f"{depth.text}: {what} is outside the method; use strut-and-tie (A23.3, 10.7)"
    )
