"""Recorded: sections of bars, bottom bars into supports and where the moment is zero, top bars."""

from __future__ import annotations

from collections.abc import Iterable, Mapping

import numpy as np

from lineproof.beams.bars import BarLayers, bars_text
from lineproof.beams.continuous.anchorage import has_hooks, ties_at
from lineproof.beams.continuous.anchorage_record import Writers, place_of, plain, record_hook
from lineproof.beams.continuous.cutoff import (
    distance,
    half_of,
    local,
    support_of,
)
from lineproof.beams.continuous.cutoff_ends import Runs, governing_inflection, tip
from lineproof.beams.continuous.cutoff_record import INFLECTION, ZERO_AT_AXIS, Site, thickest
from lineproof.beams.continuous.cutoff_sets import (
    begin,
    grouped,
    groups_of_layers,
    record_area,
    record_developed,
    record_resistance,
    text_of,
)
from lineproof.beams.continuous.detailing_bottom import support_shear
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.resistance_demand import end_tensions, end_torsion, stretch_at
from lineproof.beams.steps import Steps
from lineproof.formula import COMMON_PRACTICE
from lineproof.record import Entry
from lineproof.standards.a23_3 import cutoff as clause
from lineproof.standards.a23_3 import development, hooks, shear, shear_bars, torsion
from lineproof.standards.references import MECHANICS

HookKey = tuple[int, str, bool]
"""Support number, bar size, whether in the overhangs: hooks of one kind."""
Hooks = Mapping[HookKey, Entry]
"""Recorded development lengths of hooks."""

OUTSIDE = "-overhang"
"""Ending of the key of a part on hooks in the overhangs."""
NOT_ZERO = "no-zero-moment"
"""Key of the note that no point of inflection stands near a support."""
_NOT_ZERO = (
    "In no load case does the moment turn from the top to the bottom between this support and the "
    "other one: the limit at the point of inflection has nothing to check here. Whether the bars "
    "are developed where they are in tension is checked along the beam."
)
_ASSUMED = (
    "The analysis takes this end as simple, the top bars are designed for an assumed restraint: "
    "its moment has no diagram along the span. All top bars, those in the overhangs too, reach a "
    "quarter of the clear span past the face."
)


def record_section(
    writers: Writers, layers: BarLayers, span: int, face: Face, stated: str
) -> dict[str, Entry]:
    """Record inside the open part the bars of a section: area, depth, effective shear depth."""
    sheet = writers.sheet
    sheet.note("bars-text", f"{stated}: {bars_text(layers)}.", title="Bars")
    steps = begin(writers, sheet, span, face)
    record_area(steps, groups_of_layers(layers), "A_s")
    steps.line(shear.D_V)
    return steps.place


def record_into_support(site: Site) -> None:
    """Record that enough bottom bars run into a support, and far enough (12.11.1)."""
    side, designed = site.side, site.writers.designed
    support = support_of(side.span, side.near)
    if not designed.held(support):
        return
    sheet = site.writers.sheet
    simple = designed.exterior(support) and designed.outline.supports[support - 1].kind == "simple"
    enough = clause.INTO_SIMPLE_SUPPORT if simple else clause.INTO_CONTINUOUS_SUPPORT
    with sheet.part(site.key, f"{site.title} into support {support}"):
        sheet.note("bars-text", f"Into the support: {text_of(side.kept) or 'none'}.", title="Bars")
        if not side.kept:
            none = sheet.given("A_se", "0 mm2", source="as laid")
            sheet.check(enough, A_se=none, A_s=site.section["A_s"])
            return
        steps = begin(site.writers, sheet, side.span, "bottom")
        A_se = record_area(steps, grouped(site.writers, side.kept), "A_se", depth=False)
        steps.bind(A_s=site.section["A_s"], A_se=A_se)
        steps.check(enough)
        if side.t_kept < -half_of(designed, side.span, side.near):
            sheet.note("through", "The bars run through the support.", title="End of the bars")
            return
        steps.bind(b_sp=_given_width(site.writers, support), x_e=site.given("x_e", side.t_kept))
        steps.line(clause.IN_SUPPORT)
        steps.check(clause.LENGTH_IN_SUPPORT)


def _given_width(writers: Writers, support: int) -> Entry:
    """Record inside the open part the width of a support along the beam."""
    width = writers.designed.outline.supports[support - 1].width
    return writers.sheet.given("b_sp", plain(width, "mm"), source=f"support {support}")


def _bind_support(writers: Writers, steps: Steps, support: int, c_end: float) -> None:
    """Record and bind the width of an end support and the concrete at the end of the bars [mm]."""
    steps.bind(
        b_sp=_given_width(writers, support),
        c_end=writers.sheet.given("c_end", plain(c_end, "mm"), source="as laid"),
    )


def _beyond(writers: Writers, support: int, runs: Iterable[BarRun]) -> float:
    """Return the most concrete between bars that end in an end support and the end of the beam."""
    low, high = writers.designed.outline.ends
    return max(run.start - low if support == 1 else high - run.end for run in runs)


def record_zero_moment(site: Site, hooked: Hooks) -> None:
    """Record 12.11.3 at a simple end support or at the point of inflection near a support."""
    side, designed = site.side, site.writers.designed
    support = support_of(side.span, side.near)
    if not side.kept or not designed.held(support):
        return
    if designed.exterior(support) and designed.outline.supports[support - 1].kind == "simple":
        _record_simple(site, support, hooked)
        return
    found = governing_inflection(designed, side.span, side.near, side.kept, side.t_kept)
    if found is None:
        title = f"{site.title}: no point of inflection near support {support}"
        with site.writers.sheet.part(f"{site.key}-zero", title):
            site.writers.sheet.note(
                NOT_ZERO, _NOT_ZERO, title="Zero moment", clause="12.11.3", basis=MECHANICS
            )
        return
    title = f"{site.title}: at the point of inflection near support {support}"
    with site.writers.sheet.part(f"{site.key}-zero", title):
        steps = _kept(site)
        point = found.point
        steps.bind(x_t=site.given("x_t", point.t, "found along the span", INFLECTION))
        demand = site.demand(point.t, point.row)
        site.writers.forces(steps, demand, side.near, steps.entry("x_t"))
        steps.bind(x_e=site.given("x_e", side.t_kept))
        steps.line(clause.PAST_INWARD)
        past = Steps(site.writers.sheet, steps.place | site.section)
        past.bind(d_b=site.bar(thickest(side.kept))["d_b"])
        steps.bind(l_a=past.line(clause.PAST_INFLECTION))
        steps.line(clause.LIMIT)
        steps.check(clause.DEVELOPED_AT_ZERO_MOMENT, l_d=site.longest(side.kept)["l_d"])


def _record_simple(site: Site, support: int, hooked: Hooks) -> None:
    side, designed = site.side, site.writers.designed
    sheet = site.writers.sheet
    title = f"{site.title}: development at the simple support {support}"
    with sheet.part(f"{site.key}-zero", title):
        steps = _kept(site)
        x = 0.0 if side.near == "left" else designed.outline.lengths[side.span - 1]
        _, V = designed.forces.pairs(side.span, x, "right" if side.near == "left" else "left")
        steps.bind(x_t=site.given("x_t", 0.0, title=ZERO_AT_AXIS))
        demand = site.demand(0.0, int(np.abs(V).argmax()))
        site.writers.forces(steps, demand, side.near, steps.entry("x_t"))
        half = half_of(designed, side.span, side.near)
        _bind_support(site.writers, steps, support, half + side.t_kept)
        steps.line(clause.PAST_CENTRE)
        _, confined = support_shear(designed, side.span, side.near)
        steps.line(clause.LIMIT_CONFINED if confined else clause.LIMIT)
        lengths = [hooked[hook_key(support, r)] for r in side.kept if r.bent_at(support)]
        straight = tuple(r for r in side.kept if not r.bent_at(support))
        lengths += [site.longest(straight)["l_d"]] if straight else []
        longest = max(lengths, key=lambda e: e.value)
        steps.check(clause.DEVELOPED_AT_ZERO_MOMENT, l_d=longest)


def _kept(site: Site) -> Steps:
    """Record inside the open part the bars that run into the support and their resistance."""
    steps = begin(site.writers, site.writers.sheet, site.side.span, site.side.face)
    record_area(steps, grouped(site.writers, site.side.kept), "A_s")
    record_resistance(steps, site.writers, site.side.face)
    return steps


def record_restrained_end(site: Site) -> None:
    """Record how far all top bars reach past a face whose restraint is assumed."""
    side, writers = site.side, site.writers
    sheet = writers.sheet
    support = support_of(side.span, side.near)
    with sheet.part(f"{site.key}-restraint", f"{site.title}: past the face of the support"):
        sheet.note(
            "restraint", _ASSUMED, title="Length of the top bars", clause="12.12.1",
            basis=COMMON_PRACTICE,
        )  # fmt: skip
        if not side.runs:
            none = sheet.given("l_ext", "0 mm", source="no top bars stand at the face")
            sheet.check(clause.RESTRAINED_END, l_ext=none, l_n=writers.span(side.span)["l_n"])
            return
        shortest = side.cuts[0].t if side.cuts else side.t_kept
        steps = Steps(sheet, place_of(writers, side.span))
        steps.bind(
            b_sp=_given_width(writers, support),
            x_e=site.given("x_e", shortest, "as laid, the shortest bars"),
        )
        steps.line(clause.PAST_FACE)
        steps.check(clause.RESTRAINED_END)
        steps.bind(l_d=site.longest(side.runs)["l_d"], l_av=steps.entry("l_ext"))
        steps.check(development.DEVELOPED)


def record_hooks(writers: Writers, runs: Runs) -> Hooks:
    """Record every kind of hook at the ends of the beam in a part, with whether it fits."""
    made: dict[HookKey, Entry] = {}
    designed, sheet = writers.designed, writers.sheet
    last = len(designed.outline.supports)
    for support in (1, last):
        ties = ties_at(designed, runs, support)
        bent = [run for run in runs if run.bent_at(support)]
        named = f"support {support}" if designed.held(support) else "the free end"
        for kind in sorted({hook_key(support, run) for run in bent}):
            _, size, outside = kind
            key = f"anchorage-end-{support}-hook-{size.lower()}{OUTSIDE if outside else ''}"
            where = " in the overhangs" if outside else ""
            with sheet.part(key, f"Hooks of bars {size}{where} at {named}"):
                place = record_hook(writers, {}, support, size, ties, outside=outside)
                made[kind] = place["l_dh"]
                if designed.held(support):
                    same = [run for run in bent if hook_key(support, run) == kind]
                    beyond = _beyond(writers, support, same)
                    _record_fit(writers, Steps(sheet, place), support, beyond)
    return made


def hook_key(support: int, run: BarRun) -> HookKey:
    """Return which kind of hook a run has at an end support."""
    return support, run.size, run.outside


def _record_fit(writers: Writers, steps: Steps, support: int, c_end: float) -> None:
    _bind_support(writers, steps, support, c_end)
    steps.line(hooks.AVAILABLE)
    steps.check(hooks.FITS)
    steps.decide(hooks.IN_PART)


def record_end_bottom(site: Site, hooked: Hooks) -> None:
    """Record the force of 11.3.9.5 at the inner face of an end support and the bars there."""
    side, writers = site.side, site.writers
    sheet, designed = writers.sheet, writers.designed
    support = support_of(side.span, side.near)
    title = f"Bottom bars at the face of support {support}"
    with sheet.part(f"anchorage-end-{support}-bottom", title):
        steps = begin(writers, sheet, side.span, "bottom")
        if support in designed.end_forces:
            force = plain(designed.end_forces[support] / 1e3, "kN")
            steps.bind(F_le=sheet.given("F_le", force, source="shear"))
        else:
            _record_end_force(site, steps)
        rows = []
        half = half_of(designed, side.span, side.near)
        for run in side.kept:
            bent = run.bent_at(support)
            needed = hooked[hook_key(support, run)] if bent else site.bar(run)["l_d"]
            (group,) = grouped(writers, (run,))
            l_av = half - distance(designed, side.span, side.near, tip(run, side.near))
            rows.append((group, l_av, needed))
        if rows:
            record_developed(steps, rows, depth=False)
        else:
            steps.bind(A_sd=sheet.given("A_sd", "0 mm2", source="no bars reach the face"))
        steps.check(shear_bars.END_SUPPORT_HOLDS)


def _record_end_force(site: Site, steps: Steps) -> None:
    side, designed = site.side, site.writers.designed
    t = half_of(designed, side.span, side.near)
    x = local(designed, side.span, side.near, t)
    support = support_of(side.span, side.near)
    row = int(np.argmax(end_tensions(designed, support)))
    demand = designed.forces.demand(side.span, x, "right" if side.near == "left" else "left", row)
    steps.bind(x_f=site.writers.sheet.given("x_e", plain(t, "mm"), "face of the support"))
    site.writers.forces(steps, demand, side.near, steps.entry("x_f"))
    step = 1.0 if side.near == "left" else -1.0
    place = designed.outline.axes[side.span - 1] + x + step
    stretch = stretch_at(designed, place)
    if designed.shear:
        site.writers.shear(steps, stretch, ("V_s", "theta"))
    else:
        steps.bind(
            V_s=site.writers.sheet.given("V_s", "0 kN", source="no stirrups counted"),
            theta=site.writers.sheet.given("theta", plain(stretch.theta, "deg"), source="11.3.6.3"),
        )
    turned = end_torsion(designed, support)
    if turned is None or turned.T_f[row] <= 0 or site.writers.torsion is None:
        steps.line(shear_bars.END_SUPPORT)
        return
    site.writers.torsion(steps, demand, side.near)
    steps.line(torsion.END_SUPPORT)


def record_end_top(site: Site) -> None:
    """Record straight top bars at an end support: developed at its face."""
    side, writers = site.side, site.writers
    sheet = writers.sheet
    support = support_of(side.span, side.near)
    straight = [run for run in side.runs if not run.bent_at(support)]
    for number, size in enumerate(sorted({run.size for run in straight}), 1):
        same = [run for run in straight if run.size == size]
        with sheet.part(
            f"anchorage-end-{support}-top-{number}",
            f"Top bars {size} at the face of support {support}",
        ):
            steps = Steps(sheet, dict(site.longest(tuple(same))))
            _bind_support(writers, steps, support, _beyond(writers, support, same))
            steps.line(hooks.AVAILABLE)
            in_part = steps.decide(development.IN_PART)
            if in_part and has_hooks(writers.designed) and not steps.holds(hooks.FITS):
                steps.decide(hooks.FITS)  # why they are straight
