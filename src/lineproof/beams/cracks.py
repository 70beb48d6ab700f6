"""Crack control and skin reinforcement of clause 10.6."""

from __future__ import annotations

import math
from collections.abc import Callable

from lineproof.beams.bars import BarLayers
from lineproof.beams.flexure import midspan
from lineproof.beams.inputs import FloorBeamInputs
from lineproof.beams.loading import LOADS
from lineproof.beams.steps import Steps, only
from lineproof.formula import Formula
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars, deflection
from lineproof.standards.a23_3 import crack_control as clause
from lineproof.standards.nbc import combinations

CRACKS = "crack-control"
SKIN_BAR = "10M"


def record_cracks(sheet: Sheet, inputs: FloorBeamInputs, layers: BarLayers) -> None:
    """Record z at midspan and the skin reinforcement of deep beams."""
    steps = midspan(sheet, inputs.shape)
    with sheet.part(CRACKS, "Crack control and skin reinforcement"):
        loaded = any(part.key == LOADS for part in sheet.parts)
        cracks_inside(steps, inputs.exposure, layers, stress=_simple_span if loaded else None)
        skin_inside(steps, inputs.exposure)


def _simple_span(steps: Steps) -> None:
    """Record the stress at midspan of a simple span under dead and live load."""
    sheet = steps.sheet
    w_s1 = sheet.line(combinations.SERVICE_1, **only(sheet.entries_of(LOADS), ("w_D", "w_L")))
    steps.line(deflection.MOMENT_SIMPLE, symbol="M_s", w_s=w_s1)
    stress_inside(steps, steps.entry("A_s"))


def exposure_kind(exposure: str) -> str:
    """Return the row of the limits for an exposure class."""
    return "interior" if exposure == "N" else "exterior"


Stress = Callable[[Steps], None]
"""Records, inside the open part, the stress of the bars under specified loads and binds f_s."""


def cracks_inside(
    steps: Steps,
    exposure: str,
    layers: BarLayers,
    area: Formula = clause.TENSION_AREA,
    stress: Stress | None = None,
    *,
    coated: bool = False,
) -> None:
    """Record z inside the open part, with the concrete in tension by ``area``.

    Where the allowance for the stress of the bars does not do, ``stress`` calculates it. Bars that
    are ``coated`` with epoxy have a smaller limit.
    """
    largest = max(layers, key=lambda layer: layer.diameter)
    if largest is not layers[0]:
        steps.bind(A_b=_area_of(steps.sheet, largest.size))
    steps.lines(clause.D_C, clause.D_S, clause.BAR_COUNT, area)
    _record_limit(steps, exposure_kind(exposure), coated=coated)
    if stress is None or steps.holds(clause.ALLOWANCE_DOES):
        steps.line(clause.STRESS_ALLOWANCE)
    else:
        steps.decide(clause.ALLOWANCE_DOES)
        stress(steps)
    steps.line(clause.Z)
    steps.check(clause.CRACKS)


def _record_limit(steps: Steps, row: str, *, coated: bool) -> None:
    if not coated:
        steps.bind(z_max=steps.sheet.lookup("z_max", clause.LIMITS, row))
        return
    steps.bind(z_mu=steps.sheet.lookup("z_mu", clause.LIMITS, row, "z_max"))
    steps.line(clause.COATED_LIMIT)


def stress_inside(steps: Steps, A_s: Entry) -> None:
    """Record inside the open part the stress of the bars ``A_s`` in tension due to M_s."""
    steps.line(deflection.MODULAR_RATIO)
    steps.line(deflection.AXIS, A_s=A_s)
    flanged = "h_f" in steps.place and steps.entry("b").value > steps.entry("b_w").value
    if flanged and not steps.decide(deflection.AXIS_IN_FLANGE):
        kd_w = steps.line(deflection.AXIS_IN_WEB, A_s=A_s)
        steps.line(deflection.CRACKED_TEE, A_s=A_s)
        steps.line(clause.STRESS, kd=kd_w)
        return
    steps.line(deflection.CRACKED, A_s=A_s)
    steps.line(clause.STRESS)


def _area_of(sheet: Sheet, size: str) -> Entry:
    """Return the area of a bar: as recorded with bars of the open part, else looked up in it."""
    known = (sheet.part_entries.get(symbol) for symbol in ("A_b2", "A_bo"))
    area = bars.BARS.number(size, "A_b")
    found = next((each for each in known if each is not None and each.value == area), None)
    return sheet.lookup("A_b", bars.BARS, size) if found is None else found


def skin_inside(steps: Steps, exposure: str) -> None:
    """Record the skin reinforcement inside the open part, if the beam is that deep."""
    if steps.decide(clause.NEEDS_SKIN):
        A_bk = record_skin_area(steps, exposure, SKIN_BAR)
        each = bars_each_face(steps.place["A_sk"].value, steps.place["h_sk"].value, A_bk.value)
        record_skin_bars(steps, A_bk, each, "chosen")


def record_skin_area(steps: Steps, exposure: str, size: str) -> Entry:
    """Record inside the open part the skin reinforcement required; return the area of one bar."""
    sheet = steps.sheet
    d_bk = sheet.lookup("d_bk", bars.BARS, size, "d_b", title="diameter of the skin bars")
    steps.bind(rho_sk=sheet.lookup("rho_sk", clause.LIMITS, exposure_kind(exposure)))
    steps.line(clause.SKIN_DEPTH, d_b=d_bk)
    steps.lines(clause.SKIN_HEIGHT, clause.SKIN_WIDTH, clause.SKIN_STRIPS, clause.SKIN_AREA)
    return sheet.lookup("A_bk", bars.BARS, size, "A_b", title="area of one skin bar")


def record_skin_bars(steps: Steps, A_bk: Entry, each: int, source: str) -> None:
    """Record inside the open part the skin bars of a strip at each face, and their checks."""
    what = "number of skin bars on each face"
    n_k = steps.sheet.given("n_k", str(each), what, source=source)
    steps.check(clause.SKIN_PROVIDED, n_k=n_k, A_bk=A_bk)
    if each:  # else there is no distance
        steps.line(clause.SKIN_SPACING, n_k=n_k)
        steps.check(clause.SKIN_CLOSE)


def bars_each_face(A_sk: float, h_sk: float, A_b: float) -> int:
    """Return the bars of a strip at each face for its area, at most 200 mm apart.

    ``A_sk`` [mm2] is that of both faces, ``h_sk`` [mm] the height of a strip, ``A_b`` [mm2] the
    area of a bar.
    """
    return max(math.ceil(A_sk / 2 / A_b), math.ceil(h_sk / clause.SKIN_SPACING_MOST), 1)
