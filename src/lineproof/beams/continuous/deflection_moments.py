"""Ways to bring the moments of every stage into the record of deflections."""

from __future__ import annotations

from collections.abc import Mapping
from decimal import Decimal
from typing import Any

from lineproof.beams.continuous.deflection_record import WORDS, Moments
from lineproof.beams.continuous.deflection_service import ServiceMoments, Stage
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.standards.a23_3 import deflection_stages as stages

_PLACES = {
    "M_m": "at midspan",
    "M_h1": "at the left support",
    "M_h2": "at the right support",
    "M_h": "at the root",
    "M_mb": "at midspan of the span behind",
    "M_hb": "at the root, in the span behind",
}
_EARLIER = ("M_aem", "M_ae1", "M_ae2")


def stage_sums(
    dead: Mapping[str, Entry],
    live: Mapping[str, Entry],
    r_Ls: Entry,
    lifting: Mapping[str, Entry] | None = None,
    **earlier: Entry,
) -> Moments:
    """Return moments of the stages as sums of those of dead and of live load.

    ``dead`` and ``live`` bind the same of ``M_m``, ``M_h1``, ``M_h2`` (cantilever: ``M_h``,
    ``M_mb``, ``M_hb``); ``r_Ls`` is the share of the live load that is sustained; ``lifting`` binds
    moments of live load that lifts the span. ``earlier`` may bind ``M_aem``, ``M_ae1``, ``M_ae2``.
    """

    def record(steps: Steps, stage: Stage) -> None:
        steps.bind(**earlier)
        if stage == "dead":
            steps.bind(**dead)
            return
        formula = stages.STAGE_SUSTAINED if stage == "sustained" else stages.STAGE_ALL
        acting = (lifting or {}) if stage == "rise" else live
        for symbol, M_sD in dead.items():
            bound: dict[str, Any] = {"M_sD": M_sD, "M_sL": acting[symbol]}
            if stage == "sustained":
                bound["r_Ls"] = r_Ls
            title = f"Moment {_PLACES[symbol]}, {WORDS[stage]}"
            steps.bind(**{symbol: steps.sheet.line(formula, symbol=symbol, title=title, **bound)})

    return record


def given_moments(service: ServiceMoments, source: str, symbols: tuple[str, ...]) -> Moments:
    """Return moments of the stages as given values, such as those of an office's own analysis.

    ``symbols`` names those that the span has: ``("M_m", "M_h1", "M_h2")``.
    """

    def record(steps: Steps, stage: Stage) -> None:
        moments = service.stages[stage]
        before = dict(zip(_EARLIER, moments.earlier, strict=True))
        for symbol in symbols:
            # The root of a cantilever stands where a span has its left support.
            value = getattr(moments, "M_h1" if symbol == "M_h" else symbol)
            title = f"Moment {_PLACES[symbol]}, {WORDS[stage]}"
            made = steps.sheet.given(symbol, _text(value), title, unit="kN.m", source=source)
            steps.bind(**{symbol: made})
        for symbol, value in before.items():
            if value:
                title = "Largest moment of earlier stages"
                made = steps.sheet.given(symbol, _text(value), title, unit="kN.m", source=source)
                steps.bind(**{symbol: made})

    return record


def _text(moment: float) -> str:
    """Return a moment [N.mm] in kN.m, as exactly as it is kept."""
    return f"{Decimal(repr(moment)).scaleb(-6):f} kN.m"
