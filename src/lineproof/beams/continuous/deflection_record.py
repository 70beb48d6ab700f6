"""The record of deflections: cracked sections, every stage of loading, long-term parts, limits.

Parts ``deflection-{k}-sections``, ``deflection-{k}-dead``, ``-sustained``, ``-all`` and, last,
``deflection-{k}`` with the limits. A span that is deep enough by the span-depth table and carries
nothing that deflection damages has only the last one.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from lineproof.beams.continuous.deflection import (
    DAMAGED,
    LIVE_LIMITS,
    History,
    continuity,
    least_depth,
    plain_materials,
)
from lineproof.beams.continuous.deflection_limits import record_limits
from lineproof.beams.continuous.deflection_local import LocalLoad, Sums, record_local
from lineproof.beams.continuous.deflection_service import STAGES, FreeEnd, Stage, deflection_key
from lineproof.beams.steps import Steps, only
from lineproof.formula import COMMON_PRACTICE, Formula
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import deflection as clause
from lineproof.standards.a23_3 import deflection_stages as stages
from lineproof.standards.a23_3 import flange

Moments = Callable[[Steps, Stage], None]
"""Records, inside the open part of a stage, what its moments rest on, and binds them in ``place``.

Of a span ``M_m`` and, at continuous ends, ``M_h1`` (left axis) and ``M_h2`` (right axis); of a
cantilever ``M_h`` at its root and, unless the root is fixed, ``M_mb`` and ``M_hb`` of the span
behind; hogging moments positive. ``M_aem``, ``M_ae1``, ``M_ae2`` (root: ``M_ae1``), where bound,
are the largest moments reached before, a construction stage included.
"""
Bound = Mapping[str, Entry]
WORDS: Mapping[Stage, str] = {
    "dead": "dead load",
    "sustained": "dead load and sustained live load",
    "all": "dead load and all live load",
    "rise": "dead load and live load where it lifts the span",
}
SYMBOLS: Mapping[Stage, str] = {
    "dead": "delta_D",
    "sustained": "delta_sus",
    "all": "delta_DL",
    "rise": "delta_R",
}


_BY_COLUMNS = (
    "An end that columns alone hold, with no span beyond, counts as not continuous in the table of "
    "least depths, by the stricter reading: how far they hold it depends on their stiffness."
)


def span_name(number: int, free: FreeEnd) -> str:
    """Return what a span is called in titles."""
    return f"cantilever (span {number})" if free else f"span {number}"


@dataclass(frozen=True)
class SpanEntries:
    """One span as recorded: ``span`` binds l, l_n, h, I_g, y_b.

    ``midspan`` binds b, d, A_s; ``left`` and ``right`` bind d, A_s at continuous ends and are
    None elsewhere; a section without bars binds no A_s and must not crack (``deflection_hinges``).
    Each may bind A_sp and d_p, which are counted then. Sections at supports are the
    web, top in tension. ``behind`` is the number of the span behind a cantilever, whose deflections
    must be recorded before; None where the root is fixed. ``l_behind`` is its length. ``top`` binds
    d and A_s of the top bars that run through midspan, for spans that hog there. ``by_columns``
    tells of the left and the right end whether columns alone hold it, with no span beyond.
    """

    number: int
    span: Bound
    midspan: Bound | None
    left: Bound | None
    right: Bound | None
    free: FreeEnd = ""
    behind: int | None = None
    l_behind: Entry | None = None
    local: Sequence[LocalLoad] = ()
    local_behind: Sequence[LocalLoad] = ()
    top: Bound | None = None
    by_columns: tuple[bool, bool] = (False, False)

    @property
    def row(self) -> str:
        """The row of the span-depth table: an end held by columns alone is no continuous one."""
        ends = zip((self.left, self.right), self.by_columns, strict=True)
        return continuity(self.free, *(None if alone else end for end, alone in ends))

    @property
    def name(self) -> str:
        """What the span is called in titles."""
        return span_name(self.number, self.free)

    @property
    def ends(self) -> dict[str, Bound]:
        """Sections at continuous ends by the number of the end; the root of a cantilever is 1."""
        if self.free:
            root = self.right if self.free == "left" else self.left
            return {} if root is None else {"1": root}
        pairs = {"1": self.left, "2": self.right}
        return {end: bound for end, bound in pairs.items() if bound is not None}


def record_deflection(
    sheet: Sheet,
    span: SpanEntries,
    moments: Moments,
    *,
    carries: str,
    lifting: str,
    history: History | None = None,
    arrangement: str = "",
    calculate: bool = False,
) -> None:
    """Record the deflections of one span; ``arrangement`` says in words where live load lies.

    ``lifting`` says where it lies to lift the span, where that may govern (the stage "rise" is then
    recorded and checked), and is "" where it cannot (``ServiceMoments.lifting``). ``calculate``
    also where the span-depth table asks for no calculation: a span behind a cantilever needs it.
    """
    key = deflection_key(span.number)
    steps = Steps(sheet, span.span)
    if not (calculate or is_calculated(sheet, span, carries)):
        with sheet.part(key, f"Deflection of {span.name}"):
            _record_depth(steps, span)
        return
    with sheet.part(f"{key}-sections", f"Deflection of {span.name}: cracked sections"):
        if carries != DAMAGED:
            _record_depth(steps, span)
        _record_sections(steps, span)
        sums = record_local(steps, span.local, cantilever=span.free)
        behind = _record_behind(steps, span)
    for stage in (*STAGES, *(("rise",) if lifting else ())):
        with sheet.part(f"{key}-{stage}", f"Deflection of {span.name}: {WORDS[stage]}"):
            own = Steps(sheet, steps.place)
            _record_stage(own, span, moments, stage, (sums, behind))
        steps.bind(**{SYMBOLS[stage]: own.entry(SYMBOLS[stage])})
        if stage == "all":
            steps.bind(**only(own.place, ("M_m", "M_h1", "M_h2", "M_h")))
    steps.bind(**_ratio_rests_on(steps, span))
    with sheet.part(key, f"Deflection of {span.name}: limits"):
        record_limits(
            steps, span.row, carries=carries, history=history or History(),
            by_live=carries in LIVE_LIMITS, arrangement=arrangement, lifting=lifting,
            local=span.local, ends=tuple(span.ends),
        )  # fmt: skip


def is_calculated(sheet: Sheet, span: SpanEntries, carries: str) -> bool:
    """Tell whether a span needs a calculation: it carries such parts, or is not deep enough."""
    return carries == DAMAGED or not _is_deep(Steps(sheet, span.span), span)


def named(
    steps: Steps, formula: Formula, symbol: str = "", title: str = "", **bound: Entry
) -> Entry:
    """Record a line under another symbol and title; it stands for that symbol from here on."""
    args: dict[str, Any] = only(steps.place, formula.names) | only(bound, formula.names)
    made = steps.sheet.line(formula, symbol=symbol, title=title, **args)
    steps.bind(**{symbol or formula.symbol: made})
    return made


def _is_deep(steps: Steps, span: SpanEntries) -> bool:
    l_n, f_y, gamma_c, h = (float(steps.entry(n).value) for n in ("l_n", "f_y", "gamma_c", "h"))
    return clause.DEEP_ENOUGH.holds(least_depth(span.row, l_n, f_y, gamma_c), h)


def _record_depth(steps: Steps, span: SpanEntries) -> Entry:
    steps.bind(k_h=steps.sheet.lookup("k_h", clause.SPAN_DEPTH, span.row))
    if any(span.by_columns) and not span.free:
        steps.sheet.note(
            "by-columns", _BY_COLUMNS, title="Continuity", clause="9.8.2.1", basis=COMMON_PRACTICE
        )
    f_y, gamma_c = (float(steps.entry(n).value) for n in ("f_y", "gamma_c"))
    if plain_materials(f_y, gamma_c):
        steps.line(clause.LEAST_DEPTH)
    else:
        steps.lines(clause.STEEL_MODIFIER, clause.DENSITY_MODIFIER, clause.LEAST_DEPTH_MODIFIED)
    return steps.decide(clause.DEEP_ENOUGH)


def _record_sections(steps: Steps, span: SpanEntries) -> None:
    steps.lines(clause.MODULAR_RATIO, clause.F_R_DEFLECTION)
    if span.midspan is not None:
        steps.line(clause.CRACKING_BOTTOM)
        if "A_s" in span.midspan:
            _record_cracked(steps, span.midspan, "m", "at midspan")
    b_w = steps.entry("b_w")
    if span.ends or span.top is not None:
        steps.line(stages.CRACKING_WEB)
        title = "Moment of inertia of the web, not cracked"
        named(steps, flange.INERTIA_RECTANGLE, "I_gw", title, b_w=b_w)
    if span.top is not None:
        _record_cracked(steps, {"b": b_w, **span.top}, "t", "negative moment at midspan")
    for end, bound in span.ends.items():
        where = "at the root" if span.free else f"at the {('left', 'right')[end == '2']} support"
        if "A_s" in bound:
            _record_cracked(steps, {"b": b_w, **bound}, end, where)


def _record_cracked(steps: Steps, bound: Bound, end: str, where: str) -> None:
    """Record the cracked section of a place as ``kd_{end}``, ``I_cr{end}``."""
    own, kd = dict(bound), f"kd_{end}"
    double = "A_sp" in own
    axis = clause.AXIS_COMPRESSION_BARS if double else clause.AXIS
    own["kd"] = named(steps, axis, kd, f"{axis.title}, {where}", **own)
    if own["b"].value > steps.entry("b_w").value:
        in_flange = steps.decide(clause.AXIS_IN_FLANGE, **own)
        if not in_flange:
            axis = clause.AXIS_IN_WEB
            own["kd_w"] = named(steps, axis, f"kd_w{end}", f"{axis.title}, {where}", **own)
            tee = clause.CRACKED_TEE
            named(steps, tee, f"I_cr{end}", f"{tee.title}, {where}", **own)
            return
    formula = clause.CRACKED_COMPRESSION_BARS if double else clause.CRACKED
    named(steps, formula, f"I_cr{end}", f"{formula.title}, {where}", **own)


def _ratio_rests_on(steps: Steps, span: SpanEntries) -> Bound:
    """Return what the ratio of compression bars rests on: midspan, or the root of a cantilever."""
    bound = span.ends["1"] if span.midspan is None else span.midspan
    return {"b": steps.entry("b_w"), **bound} if "A_sp" in bound else {}


def _record_behind(steps: Steps, span: SpanEntries) -> Sums:
    if span.l_behind is None:
        return {}
    steps.bind(l_bk=span.l_behind)
    return record_local(steps, span.local_behind, cantilever=span.free, behind=True)


def _record_stage(
    steps: Steps, span: SpanEntries, moments: Moments, stage: Stage, sums: tuple[Sums, Sums]
) -> None:
    moments(steps, stage)
    if span.free:
        _record_tip(steps, span, stage, sums)
        return
    I_em = _at_midspan(steps)
    M_m = _with_local(steps, "M_m", sums[0], stage)
    l, delta = steps.entry("l"), SYMBOLS[stage]
    ends = {
        end: _inertia(steps, end, f"M_h{end}", f"at the {('left', 'right')[end == '2']} support")
        for end in span.ends
    }
    title = f"Immediate deflection at midspan, {WORDS[stage]}"
    if len(ends) == 2:  # noqa: PLR2004 - both ends
        steps.line(clause.BOTH_ENDS)
        named(steps, clause.CONTINUOUS_SPAN, delta, title, M_m=M_m, l=l)
    elif ends:
        ((end, I_ec),) = ends.items()
        steps.line(clause.ONE_END, I_em=I_em, I_ec=I_ec)
        M_h = steps.entry(f"M_h{end}")
        named(steps, stages.ONE_END_SPAN, delta, title, M_m=M_m, M_h=M_h, l=l)
    else:
        named(steps, stages.SIMPLE_SPAN, delta, title, M_m=M_m, I_e=I_em, l=l)


def _at_midspan(steps: Steps) -> Entry:
    """Record the effective inertia at midspan, of the web where the moment is hogging there."""
    M_m = steps.entry("M_m")
    if M_m.value >= 0:
        return _inertia(steps, "m", "M_m", "at midspan", I_g=steps.entry("I_g"))
    before, title = steps.place.get("M_aem"), ""
    if before is not None and before.value < M_m.value:
        M_m, title = before, "Size of the negative moment of the earlier stage, which is larger"
    named(steps, stages.HOGGING_SIZE, "M_at", title, M_s=M_m)
    return _inertia(steps, "t", "M_at", "negative moment at midspan", gives="I_em")


def _record_tip(steps: Steps, span: SpanEntries, stage: Stage, sums: tuple[Sums, Sums]) -> None:
    I_e = _inertia(steps, "1", "M_h", "at the root")
    M_h = _with_local(steps, "M_h", sums[0], stage)
    named(steps, stages.CANTILEVER_BENDING, "", "", M_h=M_h, I_e=I_e)
    title = f"Immediate deflection of the tip, {WORDS[stage]}"
    if span.behind is None:
        named(steps, stages.TIP_FIXED, SYMBOLS[stage], title)
        return
    M_mb = _with_local(steps, "M_mb", sums[1], stage)
    # Live load that lifts the tip lies on the span behind: it is as cracked as under all load.
    as_in = "all" if stage == "rise" else stage
    entries = steps.sheet.entries_of(deflection_key(span.behind, as_in))
    I_bk = entries["I_ea"] if "I_ea" in entries else entries["I_em"]
    steps.line(stages.ROOT_ROTATION, M_mb=M_mb, I_bk=I_bk)
    named(steps, stages.TIP, SYMBOLS[stage], title)


def _with_local(steps: Steps, symbol: str, sums: Sums, stage: Stage) -> Entry:
    """Return the moment that counts for the deflection: with local loads, or as it is."""
    M, M_P = steps.entry(symbol), sums.get(stage)
    if M_P is None:
        return M
    place = "M_q" if symbol != "M_mb" else "M_qb"
    return named(steps, stages.WITH_LOCAL_LOADS, place, "", M_s=M, M_P=M_P)


def _inertia(
    steps: Steps, end: str, symbol: str, where: str, I_g: Entry | None = None, gives: str = ""
) -> Entry:
    """Record the largest moment so far and the effective inertia of a place."""
    M_a, before = steps.entry(symbol), steps.place.get(f"M_ae{end}")
    if before is not None:
        title = f"{stages.LARGEST_SO_FAR.title}, {where}"
        M_a = named(steps, stages.LARGEST_SO_FAR, f"M_a{end}", title, M_s=M_a, M_ae=before)
    top = end != "m"
    limit = steps.entry("M_crdn" if top else "M_crd")
    gross = steps.entry("I_gw") if I_g is None else I_g
    bound = {"M_a": M_a, "I_g": gross, limit.symbol: limit}
    if M_a.value <= limit.value:
        test = stages.UNCRACKED_TOP if top else stages.UNCRACKED
        args: dict[str, Any] = {n: bound[n] for n in test.names}
        steps.sheet.decide(test, key=f"{test.key}-{end}", title=f"{test.title}, {where}", **args)
        formula = stages.GROSS
    else:
        formula = clause.EFFECTIVE_TOP if top else clause.EFFECTIVE
        bound["I_cr"] = steps.entry(f"I_cr{end}")
    return named(
        steps, formula, gives or f"I_e{end}", f"Effective moment of inertia, {where}", **bound
    )
