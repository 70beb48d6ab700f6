"""The last part of the record of a span's deflections: long-term parts, limits, information."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Any

from lineproof.beams.continuous import curvature
from lineproof.beams.continuous.deflection import History
from lineproof.beams.continuous.deflection_local import LocalLoad, points_at
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE, FROM_MEMORY, Criterion
from lineproof.record import Procedure
from lineproof.sentences import begun
from lineproof.standards.a23_3 import deflection as clause
from lineproof.standards.a23_3 import deflection_stages as stages

_HISTORY = (
    "Parts that the span carries are attached {attached} after the load begins to act; "
    "what has deflected by then is not counted for them. The load is sustained "
    "for {final}."
)
_ROOT = (
    "The deflection of the tip includes the rotation of the root by bending of the span behind. "
    "Live load lies where it lets the tip sink most."
)
_MIDSPAN = (
    "Deflections are those at midspan, moments those at the axes of the supports. Sections are as "
    "cracked as the moments of the stage, or larger earlier ones that are stated, make them. The "
    "largest deflection may lie beside midspan; the curvature along the span shows by how much."
)
_RISE = "Live load that lifts the span most: {}."
_NO_RISE = (
    "Live load that lifts the span moves it less than live load that lets it sink, and the span "
    "lies below its level under sustained load: a rise does not govern."
)
_CAMBER = (
    "For information: no camber is counted in the checks. Camber takes away from the total "
    "deflection, not from what comes after parts are attached."
)
_BESIDE = (
    "For information: curvature integrated along the span under dead and all live load, every "
    "section as cracked as its own moment makes it."
)


def record_limits(
    steps: Steps,
    row: str,
    *,
    carries: str,
    history: History,
    by_live: bool,
    arrangement: str,
    lifting: str,
    local: Sequence[LocalLoad],
    ends: Sequence[str],
) -> None:
    """Record inside the open part long-term parts and the checks of sag and rise."""
    sheet = steps.sheet
    cantilever = row.endswith("cantilever")
    sheet.note("carries", f"The span carries: {carries}.", title="Limit of Table 9.3")
    if arrangement:
        sheet.note("arrangement", f"{begun(arrangement.rstrip('.'))}.", title="Live load")
    sheet.note("place", _ROOT if cantilever else _MIDSPAN, title="Place")
    words = {"attached": _time(history.attached), "final": history.final}
    sheet.note("history", _HISTORY.format(**words), title="History of loading")
    _record_long_term(steps, history)
    steps.lines(clause.LIVE, clause.REST_OF_LIVE, clause.TOTAL, clause.AFTER_ATTACHMENT)
    steps.bind(k_D=sheet.lookup("k_D", clause.LIMITS, carries))
    steps.line(clause.LARGEST)
    steps.check(clause.LIVE_SMALL if by_live else clause.ATTACHED_SMALL)
    _record_rise(steps, lifting, by_live=by_live)
    steps.line(stages.CAMBER)
    sheet.note("camber", _CAMBER, title="Camber", clause="9.8.2.6", basis=FROM_MEMORY)
    if not cantilever and all(f"I_cr{place}" in steps.place for place in ("m", *ends)):
        sheet.note("beside", _BESIDE, title="Curvature", basis=COMMON_PRACTICE)
        _record_curvature(steps, ends, local)


def _record_rise(steps: Steps, lifting: str, *, by_live: bool) -> None:
    note = _RISE.format(lifting) if lifting else _NO_RISE
    steps.sheet.note("rise", note, title="Rise", basis=COMMON_PRACTICE)
    if lifting:
        steps.line(stages.RISE if by_live else stages.RISE_ATTACHED)
        steps.check(stages.RISE_SMALL)


def _time(row: str) -> str:
    return row.replace(" or more", "")


def _record_long_term(steps: Steps, history: History) -> None:
    sheet = steps.sheet
    S_t = sheet.lookup("S_t", clause.DURATIONS, history.final)
    S_ta = sheet.lookup("S_ta", clause.DURATIONS, history.attached, "S_t")
    if "A_sp" not in steps.place:
        steps.line(stages.LONG_TERM_PLAIN, S_t=S_t)
        steps.line(stages.LONG_TERM_ATTACHED_PLAIN, S_ta=S_ta)
        return
    steps.line(clause.COMPRESSION_RATIO)
    steps.line(clause.LONG_TERM, S_t=S_t)
    steps.line(clause.LONG_TERM_ATTACHED, S_t=S_ta)


def _record_curvature(steps: Steps, ends: Sequence[str], local: Sequence[LocalLoad]) -> None:
    procedure, closing = _procedure(ends)
    if len(ends) == 1:
        (end,) = ends
        steps.bind(I_cre=steps.entry(f"I_cr{end}"), M_h=steps.entry(f"M_h{end}"))
    points = points_at(local, float(steps.entry("l").value))
    settings: dict[str, Any] = curvature.settings_of(points)
    steps.found(
        "delta_k", procedure, closing, unit="mm", clause="9.8.2", settings=settings,
        title="Largest immediate deflection by curvature, dead and all live load",
    )  # fmt: skip


def _procedure(ends: Sequence[str]) -> tuple[Procedure, Criterion]:
    if not ends:
        return curvature.SIMPLE, stages.BOUND_SIMPLE
    if len(ends) == 1:
        left = ends[0] == "1"
        return curvature.LEFT_END if left else curvature.RIGHT_END, stages.BOUND_ONE_END
    return curvature.BOTH_ENDS, stages.BOUND_BOTH_ENDS
