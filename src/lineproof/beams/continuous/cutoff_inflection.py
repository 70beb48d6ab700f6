"""Recorded: top bars past the point of inflection, how far and how many of them (12.12.2)."""

from __future__ import annotations

from lineproof.beams.continuous.anchorage import value
from lineproof.beams.continuous.cutoff import Point, no_further_need
from lineproof.beams.continuous.cutoff_ends import Ending, Runs, passes
from lineproof.beams.continuous.cutoff_need import Need
from lineproof.beams.continuous.cutoff_record import (
    INFLECTION,
    Site,
    ends_before,
    record_extension,
    thickest,
)
from lineproof.beams.continuous.cutoff_sets import grouped, record_area, text_of
from lineproof.beams.continuous.numbers import holds
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.standards.a23_3 import cutoff as clause


def record_past_inflection(site: Site) -> None:
    """Record how far the longest top bars pass the point of inflection, and a third of the steel.

    Counted are the longest bars; where they are less than a third, also those of the others that
    pass the point by the length of 12.12.2.
    """
    side, designed = site.side, site.writers.designed
    point = no_further_need(site.frame, "top", side.span, side.near, 0.0)
    through = passes(designed, side)
    with site.writers.sheet.part(f"{site.key}-inflection", f"{site.title}: past the inflection"):
        if through:
            _note_through(site)
        elif point is None:
            _fail_inflection(site)
        else:
            _record_extension(site, point)
        if point is None or designed.cantilever(side.span):
            return
        further = () if _a_third(site, side.kept) else _further(site, point)
        if not further:
            _record_third(site, point, through=through)
    if further:
        _record_with(site, point, further)


def _a_third(site: Site, runs: Runs) -> bool:
    A_pi = sum(run.area for run in runs)
    return holds(clause.TOP_PAST_INFLECTION, {"A_s": site.section["A_s"].value, "A_pi": A_pi})


def _further(site: Site, point: Point) -> tuple[Ending, ...]:
    """Return the bars that end past the point by the length of 12.12.2, the longest first.

    No more of them than make up a third of the steel together with the longest bars.
    """
    side = site.side
    made: list[Ending] = []
    for ending in reversed(side.cuts):
        counted = (*(run for each in made for run in each.runs), *side.kept)
        if _a_third(site, counted) or ending.t - point.t < _least(site, ending.runs):
            break
        made.append(ending)
    return tuple(made)


def _least(site: Site, runs: Runs) -> float:
    """Return the least length of bars past the point of inflection [mm]."""
    d_b, d = thickest(runs).diameter, site.section["d"].value
    l_n = site.writers.span(site.side.span)["l_n"].value
    return value(clause.LENGTH_PAST_INFLECTION, d=d, d_b=d_b, l_n=l_n)


def _note_through(site: Site) -> None:
    side, free = site.side, site.writers.designed.cantilever(site.side.span)
    on = text_of(run for run in side.kept if run not in side.met)
    text = f"{on} run {'to the free end' if free else 'on'}"
    if side.met:
        text += f"; {text_of(side.met)} end beside the bars of the next support, past midspan"
    site.writers.sheet.note(
        "through",
        f"{text}: they do not end near a point of inflection.",
        title="End of the top bars",
        basis=COMMON_PRACTICE,
    )


def _fail_inflection(site: Site) -> None:
    """Record a check that fails: bars end although the top stays in tension up to midspan."""
    sheet = site.writers.sheet
    sheet.note(
        "no-inflection",
        "In some load case the top stays in tension up to midspan: the bars may not end before.",
        title="Point of inflection",
        clause="12.12.2",
    )
    none = sheet.given("l_ext", "0 mm", source="no point of inflection")
    sheet.check(clause.LONG_PAST_INFLECTION, l_pi=site.section["d"], l_ext=none)


def _source(site: Site, point: Point) -> str:
    return f"found along the span, {site.writers.designed.forces.cases[point.row]}"


def _record_extension(site: Site, point: Point) -> None:
    """Record inside the open part how far the longest bars pass the point of inflection."""
    side = site.side
    steps = Steps(site.writers.sheet, site.section)
    steps.bind(x_t=site.given("x_t", point.t, _source(site, point), INFLECTION))
    need = Need(side.span, side.near, point, behind=False)
    past = record_extension(site, steps, need, side.t_kept, side.kept)
    _record_length(past)


def _record_length(steps: Steps) -> None:
    """Record the length of 12.12.2 past the point against the one there is, l_ext."""
    steps.line(clause.LENGTH_PAST_INFLECTION)
    title = ends_before(clause.LONG_PAST_INFLECTION, steps.entry("l_ext"))
    steps.check(clause.LONG_PAST_INFLECTION, title=title)


def _record_third(site: Site, point: Point, *, through: bool) -> None:
    """Record inside the open part the area of the longest bars against a third of all."""
    side, sheet = site.side, site.writers.sheet
    steps = Steps(sheet, site.writers.sizes.get("top", {}))
    if through or side.t_kept >= point.t:
        A_pi = record_area(steps, grouped(site.writers, side.kept), "A_pi", depth=False)
    else:
        A_pi = sheet.given("A_pi", "0 mm2", source="all of them end before it")
    steps.bind(A_pi=A_pi, A_s=site.section["A_s"])
    steps.check(clause.TOP_PAST_INFLECTION)


def _record_with(site: Site, point: Point, further: tuple[Ending, ...]) -> None:
    """Record in a part that a third of the steel passes the point, with bars that end past it."""
    side, sheet, writers = site.side, site.writers.sheet, site.writers
    sizes = writers.sizes.get("top", {})
    ending = further[-1]
    runs = (*(run for each in further for run in each.runs), *side.kept)
    with sheet.part(f"{site.key}-third", f"{site.title}: a third past the inflection"):
        sheet.note(
            "bars-text", f"{text_of(runs)} pass the point of inflection.", title="Bars counted"
        )
        steps = Steps(sheet, dict(writers.span(side.span)) | dict(sizes) | site.section)
        steps.bind(x_t=site.given("x_t", point.t, _source(site, point), INFLECTION))
        shortest = "as laid, the first of them to end"
        steps.bind(x_e=site.given("x_e", ending.t, shortest))
        steps.bind(d_b=site.bar(thickest(runs))["d_b"])
        steps.line(clause.PAST_OUTWARD)
        _record_length(steps)
        area = Steps(sheet, sizes)
        A_pi = record_area(area, grouped(writers, runs), "A_pi", depth=False)
        area.bind(A_pi=A_pi, A_s=site.section["A_s"])
        area.check(clause.TOP_PAST_INFLECTION)
