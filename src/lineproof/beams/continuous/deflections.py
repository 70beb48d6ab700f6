"""Deflections of every span: what stands on the sheet, handed to the record of deflections."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.continuous.deflection import History
from lineproof.beams.continuous.deflection_hinges import (
    continuous_with,
    hinge_of,
    record_beside,
    record_hinge,
)
from lineproof.beams.continuous.deflection_local import LocalLoad
from lineproof.beams.continuous.deflection_record import (
    SpanEntries,
    is_calculated,
    record_deflection,
    span_name,
)
from lineproof.beams.continuous.deflection_service import (
    SHARES,
    ServiceMoments,
    deflection_key,
    free_end,
    service_moments,
    span_behind,
    sustained_share,
)
from lineproof.beams.continuous.deflection_top import (
    bottom_recorded,
    hogging_cracks,
    record_bottom,
    record_top,
)
from lineproof.beams.continuous.design import Design
from lineproof.beams.continuous.developed import bars_of
from lineproof.beams.continuous.geometry import span_place
from lineproof.beams.continuous.model import GIVEN, Model
from lineproof.beams.continuous.service import record_construction, service_lines
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.record import Entry
from lineproof.sheet import Sheet

SERVICE = "service"
_CONSTRUCTION = (
    "The forms are struck or shores of the floor above stand on the beam: dead load and the "
    "construction load act on all spans. The largest moment reached so far cracks the section for "
    "all later stages. The full dead load is taken, superimposed load included."
)
_SNOW = (
    "No part of the snow load is taken as sustained. Beside snow as the principal load stands the "
    "live load that accompanies it, and the sustained share of that. Where snow lies for months, "
    "the designer adds its lasting part as dead load."
)
_NOT_COVERED = (
    "The moments are those of a frame analysis, of factored cases. Deflections need the moments of "
    "every load type and the loads of every span, which such a file does not give: they are NOT "
    "checked here, and the cover lists them. Take them from the frame analysis, with cracked "
    "sections and long-term parts."
)
_SPAN = ("l", "l_n", "h", "I_g", "y_b")


def record_not_covered(sheet: Sheet) -> None:
    """Record that deflections of moments that were brought in are no part of the calculation."""
    with sheet.part(SERVICE, "Deflections: not covered"):
        sheet.note("not-covered", _NOT_COVERED, title="Deflections", clause="9.8")


def record_deflections(design: Design) -> None:
    """Record the deflections of every span; a cantilever after the span behind it.

    Where hogging cracks a midspan, the top bars that run through it are recorded before. A span
    that cracks where no bars stand, and those continuous with it, are given no deflection.
    """
    model = design.model
    r_Ls = _record_share(model)
    services = {span: service_of(model, span) for span in range(1, model.spans + 1)}
    found = {span: hinge_of(design, span, services) for span in services}
    hinges = {span: hinge for span, hinge in found.items() if hinge is not None}
    beside = continuous_with(model, tuple(hinges))
    for hinge in hinges.values():
        earlier = _earlier(model, hinge.span) if hinge.loading.building else {}
        record_hinge(design, hinge, earlier, name_of(model, hinge.span))
    for span, of_hinge in sorted(beside.items()):
        record_beside(model.sheet, span, name_of(model, span), of_hinge)
    order = sorted(range(1, model.spans + 1), key=lambda k: (model.forces.beam.cantilever(k), k))
    wanted = {span_behind(model.forces.beam, k) for k in order if model.forces.beam.cantilever(k)}
    for span in order:
        if span not in hinges and span not in beside:
            _record_span(design, services[span], r_Ls, asked=span in wanted)


def name_of(model: Model, span: int) -> str:
    """Return what a span is called in titles."""
    return span_name(span, free_end(model.forces.beam, span))


def _record_span(design: Design, service: ServiceMoments, r_Ls: Entry, *, asked: bool) -> None:
    model, span = design.model, service.span
    free = free_end(model.forces.beam, span)
    if not free:
        record_bottom(design, span)
    entries = _entries_of(model, service, r_Ls)
    asked = asked or is_calculated(model.sheet, entries, model.inputs.carries)
    earlier = _earlier(model, span)
    before = earlier["M_aem"].value if "M_aem" in earlier else 0.0
    if asked and not free and hogging_cracks(model, span, service.stages, before):
        entries = replace(entries, top=record_top(design, span))
    record_deflection(
        model.sheet,
        entries,
        service_lines(model, service, entries.behind, earlier),
        carries=model.inputs.carries,
        history=history_of(model),
        lifting=service.lifting,
        arrangement=service.arrangement,
        calculate=asked,
    )


def _earlier(model: Model, span: int) -> dict[str, Entry]:
    """Record the moments of the construction stage, if there is one."""
    if model.inputs.construction_load is None:
        return {}
    title = f"Deflection of {name_of(model, span)}: construction stage"
    with model.sheet.part(deflection_key(span, "construction"), title):
        model.sheet.note(
            "construction", _CONSTRUCTION, title="Construction stage", clause="9.8.2.3"
        )
        return record_construction(Steps(model.sheet, {}), model, span)


def history_of(model: Model) -> History:
    """Return when parts are attached, as given, and that load is sustained for good."""
    return History(attached=model.inputs.attached_after)


def shares_of(model: Model) -> dict[str, float]:
    """Return the sustained part of every load type."""
    typed = model.inputs.sustained
    share = float(sustained_share(model.inputs.use)[0]) if typed is None else typed.value
    return {**SHARES, "L": share, "L_st": share}


def service_of(model: Model, span: int) -> ServiceMoments:
    """Return the service moments of a span, live load where it deflects it most."""
    return service_moments(
        model.forces.beam, model.forces.loads, span, shares=shares_of(model),
        solution=model.forces.solution,
    )  # fmt: skip


def _record_share(model: Model) -> Entry:
    """Record the share of the live load that is sustained, given or assumed."""
    typed = model.inputs.sustained
    share, said = sustained_share(model.inputs.use)
    sheet = model.sheet
    with sheet.part(SERVICE, "Service loads for deflections"):
        if "S" in model.kinds():
            sheet.note("snow", _SNOW, title="Snow", clause="9.8.2", basis=COMMON_PRACTICE)
        if typed is not None:
            return sheet.given("r_Ls", typed, source="given")
        return sheet.given("r_Ls", share, source=said)


def _entries_of(model: Model, service: ServiceMoments, r_Ls: Entry) -> SpanEntries:
    sheet, beam, span = model.sheet, model.forces.beam, service.span
    place = span_place(sheet, model.inputs, span)
    free = free_end(beam, span)
    behind = span_behind(beam, span) if free else None
    midspan = None
    if not free:
        b = place.get("b_f", sheet.entry(f"{GIVEN}/b_w"))
        midspan = {"b": b, **bottom_recorded(model, span)}
    return SpanEntries(
        span,
        {name: place[name] for name in _SPAN},
        midspan,
        top_at(model, span, "right"),
        top_at(model, span + 1, "left"),
        free,
        behind,
        None if behind is None else model.lengths[behind - 1],
        _local(model, service, span, r_Ls),
        () if behind is None else _local(model, service, behind, r_Ls),
        by_columns=(_by_columns(model, span), _by_columns(model, span + 1)),
    )


def _by_columns(model: Model, support: int) -> bool:
    """Tell whether columns alone hold the beam at a support, with no span beyond."""
    exterior = support in (1, model.spans + 1)
    return exterior and model.inputs.supports[support - 1].kind == "elastic"


def top_at(model: Model, support: int, side: str) -> Mapping[str, Entry] | None:
    """Return d and A_s of the top bars at a continuous end; None at a simple or free end.

    Empty where no bars stand.
    """
    kind = model.inputs.supports[support - 1].kind
    exterior = support in (1, model.spans + 1)
    if kind == "free" or (kind == "simple" and exterior):
        return None
    for each in (side, "left", "right"):
        found = [p for p in model.sheet.parts if p.key == f"hog-{support}-{each}"]
        if found and "bars-text" in found[0].entries:
            return bars_of(model.sheet, found[0].key)
    return None


def _local(model: Model, service: ServiceMoments, span: int, r_Ls: Entry) -> tuple[LocalLoad, ...]:
    """Return the single loads on a span as the record of deflections takes them."""
    made = []
    for load in model.on_span(span):
        names = {"P_s": load.size, "x_P": load.at}
        if load.at is None:
            names = {"w_p": load.size, "x_1": load.start, "x_2": load.end}
        bound = {name: entry for name, entry in names.items() if entry is not None}
        factors = service.factors_on(load.kind, span)
        made.append(LocalLoad(bound, factors, r_Ls if load.kind in LIVE else None))
    return tuple(made)
