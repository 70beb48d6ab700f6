"""Development lengths of bars and hooks in plain numbers, by the formulas of the catalogue."""

from __future__ import annotations

import math
from bisect import bisect_left, bisect_right
from collections.abc import Iterable
from dataclasses import dataclass
from functools import lru_cache
from typing import Any, Literal

from lineproof.beams.bars import spaced
from lineproof.beams.continuous import numbers
from lineproof.beams.continuous.bending import hook_leg
from lineproof.beams.continuous.detailing_data import Basis, Designed, Strengths
from lineproof.beams.continuous.layout import BarRun, BeamOutline, Face
from lineproof.beams.inputs import OVERHANGS
from lineproof.formula import Criterion, Formula
from lineproof.standards.a23_3 import bars as bar_clause
from lineproof.standards.a23_3 import cover, development, hooks, laps
from lineproof.standards.a23_3.bars import BARS, STIRRUP_BENDS

Place = Literal["web", "overhang", "side face"]
TOP_ROW, OTHER_ROW = "more than 300 mm of fresh concrete below", "other"
COVERED_ROW, UNCOVERED_ROW = "side cover 60 mm and tail cover 50 mm or more", "less"
TIED_ROW, ASKED_ROW, UNTIED_ROW = hooks.TIE_FACTORS.rows
WIDEST_BENDS = "400R"
"""A grade with the wider bends of the two."""
TIE_STEP = 5.0
"""Step of the spacing of ties around hooks [mm]."""


def value(formula: Formula, **given: float) -> float:
    """Return the value of a catalogue formula in N, mm, MPa."""
    return numbers.value(formula, given)


def holds(test: Criterion, **given: float) -> bool:
    """Tell whether a catalogue criterion holds."""
    return numbers.holds(test, given)


@dataclass(frozen=True, slots=True)
class Bar:
    """Bars whose development length is asked for.

    ``number`` stand side by side in their layer (in all overhangs together), in concrete of the
    depth ``h``; ``room`` is the width of one overhang that holds ``number``/sides bars.
    """

    face: Face
    place: Place
    layer: int
    size: str
    number: int
    h: float
    room: float = 0.0


@dataclass(frozen=True, slots=True)
class Development:
    """Development of a bar: whether it is a top bar, the expression used, lengths [mm].

    ``table`` and ``general`` are lengths before the least one; ``general`` is 0 for bars in an
    overhang, which the table alone gives. ``lap`` is the length of a class B lap.
    """

    bar: Bar
    s_c: float
    top: bool
    short: bool
    table: float
    general: float
    l_d0: float
    l_d: float
    lap: float


def sides_of(outline: BeamOutline) -> int:
    """Return the number of overhangs."""
    return OVERHANGS[outline.shape]


@lru_cache(maxsize=1024)
def develop(basis: Basis, bar: Bar) -> Development:
    """Return the development lengths of a bar."""
    s = basis.strengths
    row = BARS.rows[bar.size]
    d_b, A_b = float(row["d_b"]), float(row["A_b"])
    d_bs = BARS.number(basis.stirrups.size, "d_b")
    c_b1 = value(cover.COVER_TO_BARS, c_c=basis.outline.cover, d_bs=d_bs)
    s_c = clear_distance(basis, bar)
    top = holds(development.TOP_BAR, h_u=_below(basis, bar, d_bs, d_b))
    common = {
        "k_1": development.LOCATION.number(TOP_ROW if top else OTHER_ROW, "k_1"),
        "k_2": development.COATING.number(_coating(s, d_b, c_b1, s_c), "k_2"),
        "k_3": development.DENSITY.number(s.density, "k_3"),
        "k_4": development.SIZE.number(bar.size, "k_4"),
        "f_y": s.f_y, "f_c": s.f_c, "d_b": d_b, "A_b": A_b,
    }  # fmt: skip
    short = holds(development.COVERED, d_b=d_b, c_b1=c_b1) and _far_apart(basis, bar, d_b, s_c)
    table = value(development.SHORT if short else development.LONG, **common)
    general = 0.0
    if bar.place == "web":
        general = _general(basis, bar, s_c, d_bs, common)
    l_d0 = general if basis.expression == "general" and general else table
    return Development(
        bar, s_c, top, short, table, general, l_d0,
        value(development.L_D, l_d0=l_d0), value(laps.CLASS_B, l_d0=l_d0),
    )  # fmt: skip


def _coating(s: Strengths, d_b: float, c_b1: float, s_c: float) -> str:
    """Return the row of the coating factor."""
    if s.coating == development.UNCOATED:
        return development.UNCOATED
    covered = holds(development.COATED_COVERED, d_b=d_b, c_b1=c_b1)
    apart = holds(development.COATED_SPACED, d_b=d_b, s_c=s_c)
    return development.COATED if covered and apart else development.COATED_CLOSE


def _below(basis: Basis, bar: Bar, d_bs: float, d_b: float) -> float:
    """Return the depth of fresh concrete below a bar: below an overhang, that of the slab."""
    if bar.face == "bottom":
        return 0.0
    depth = basis.outline.h_f if bar.place == "overhang" else bar.h
    return value(development.FRESH_BELOW, h=depth, c_c=basis.outline.cover, d_bs=d_bs, d_b=d_b)


def clear_distance(basis: Basis, bar: Bar) -> float:
    """Return the clear distance between the bars of a layer, or of an overhang."""
    d_b = BARS.number(bar.size, "d_b")
    if bar.place == "overhang":
        each = bar.number / sides_of(basis.outline)
        return value(development.CLEAR_OVERHANG, b_ot=bar.room, n_o=each, d_b=d_b)
    return value(
        bar_clause.CLEAR, b_w=basis.outline.b_w, c_c=basis.outline.cover,
        d_bs=BARS.number(basis.stirrups.size, "d_b"), n_b=float(bar.number), d_b=d_b,
        r_s=STIRRUP_BENDS.number(basis.stirrups.size, "r_s"),
    )  # fmt: skip


def _far_apart(basis: Basis, bar: Bar, d_b: float, s_c: float) -> bool:
    if bar.place == "overhang":
        return holds(development.SPACED_SLAB, d_b=d_b, s_c=s_c)
    return basis.stirrups.minimum and holds(development.SPACED, d_b=d_b, s_c=s_c)


def _general(basis: Basis, bar: Bar, s_c: float, d_bs: float, common: dict[str, Any]) -> float:
    d_b = common["d_b"]
    d_cn = value(development.TO_SURFACE, c_c=basis.outline.cover, d_bs=d_bs, d_b=d_b)
    s_bb = value(development.CENTRES, s_c=s_c, d_b=d_b)
    A_bs = BARS.number(basis.stirrups.size, "A_b")
    A_tr = value(development.A_TR, n_v=float(basis.stirrups.legs), A_bs=A_bs)
    K_tr = value(
        development.K_TR, A_tr=A_tr, f_yt=basis.strengths.f_y, s=basis.stirrups.spacing,
        n_d=float(bar.number),
    )  # fmt: skip
    d_cs = value(development.D_CS, d_cn=d_cn, s_bb=s_bb)
    return value(development.GENERAL, d_cs=d_cs, K_tr=K_tr, **common)


def bar_of(designed: Designed, run: BarRun) -> Bar:
    """Return what the development of a run rests on: the fullest layer, the deepest concrete.

    A bar alone in its layer is taken as one of two.
    """
    axes = designed.outline.axes
    first, last = bisect_right(axes, run.start), bisect_left(axes, run.end)
    spans = list(range(max(first, 1), min(last, len(axes) - 1) + 1))
    spans = spans or [1 if run.end <= 0 else len(designed.outline.lengths)]
    h = max(designed.outline.depths[k - 1] for k in spans)
    if run.place == "overhang":
        met = zip(axes, designed.bars.top, strict=False)
        number = max([run.number, *(top.overhang for x, top in met if run.start <= x <= run.end)])
        return Bar(run.face, "overhang", 1, run.size, number, h, room_beside(designed, spans))
    layers = _layers_met(designed, run, spans)
    beside = [layer[run.layer - 1].count for layer in layers if len(layer) >= run.layer]
    return Bar(run.face, "web", run.layer, run.size, spaced(max([run.number, *beside])), h)


def development_length(designed: Designed, run: BarRun) -> float:
    """Return the development length of a run in tension [mm]."""
    return develop(designed.basis, bar_of(designed, run)).l_d


def _layers_met(designed: Designed, run: BarRun, spans: list[int]) -> list[Any]:
    if run.face == "bottom":
        return [designed.bars.bottom[k - 1] for k in spans]
    axes = designed.outline.axes
    return [
        top.web for x, top in zip(axes, designed.bars.top, strict=True) if run.start <= x <= run.end
    ]


def room_beside(designed: Designed, spans: list[int]) -> float:
    """Return the least width of one overhang in which top bars are spread (10.5.3.1)."""
    outline = designed.outline
    sides = sides_of(outline) or 1
    return min(
        min((outline.widths[k - 1] - outline.b_w) / sides, outline.lengths[k - 1] / 20)
        for k in spans
    )


@dataclass(frozen=True, slots=True)
class HookLength:
    """A 90 degree hook at an end of the beam: covers, whether ties are laid, its length [mm]."""

    size: str
    c_side: float
    c_tail: float
    c_top: float
    tied: bool
    s_tie: float
    l_hb: float
    l_dh: float


def side_cover(designed: Designed, support: int) -> float:
    """Return the side cover of the corner bars in a support [mm]; below 0 beside a column."""
    outline = designed.outline
    d_bs = BARS.number(designed.basis.stirrups.size, "d_b")
    given = {"c_c": outline.cover, "d_bs": d_bs}
    breadth = designed.breadths.get(support, outline.b_w)
    if breadth != outline.b_w:
        return value(hooks.SIDE_COVER_COLUMN, b_col=breadth, b_w=outline.b_w, **given)
    return value(cover.COVER_TO_BARS, **given)


def ties_row(*, side: bool, face: bool, tied: bool) -> str:
    """Return the row of the factor for ties: those that small covers ask for earn nothing.

    ``side`` and ``face`` tell whether these covers are large enough, ``tied`` whether ties stand.
    """
    if not tied:
        return UNTIED_ROW
    return TIED_ROW if side or face else ASKED_ROW


def hook_at(designed: Designed, support: int, size: str, *, outside: bool = False) -> HookLength:
    """Return the hook of a bar at an end of the beam.

    ``outside`` says that the bar stands in an overhang, where the ties of the web earn it nothing.
    Of a beam as built only ties that are given are known; those too far apart earn nothing.
    Raises :class:`UserError` for an edition whose hooks cannot be calculated.
    """
    s = designed.strengths
    basic = hooks.basic_length(designed.pair)
    d_b = BARS.number(size, "d_b")
    c_side = side_cover(designed, support)
    c_tail = designed.c_tail
    c_top = value(
        cover.COVER_TO_BARS, c_c=designed.outline.cover,
        d_bs=BARS.number(designed.basis.stirrups.size, "d_b"),
    )  # fmt: skip
    side, face = holds(hooks.SIDE_COVERED, c_side=c_side), holds(hooks.FACE_COVERED, c_top=c_top)
    reduced = side and holds(hooks.TAIL_COVERED, c_tail=c_tail) and holds(laps.LAPPABLE, d_b=d_b)
    tied = ties_stand(designed, support) and not (side and face)
    s_tie = designed.hook_ties.get(support) or _tie_spacing_apart(designed, d_b)
    close = holds(hooks.TIED, s_tie=s_tie, d_b=d_b)
    ties = ties_row(side=side, face=face, tied=tied and close and not outside)
    l_hb = value(basic, d_b=d_b, f_c=s.f_c, f_y=s.f_y)
    l_dh = value(
        hooks.L_DH,
        k_hc=hooks.COVER_FACTORS.number(COVERED_ROW if reduced else UNCOVERED_ROW, "k_hc"),
        k_ht=hooks.TIE_FACTORS.number(ties, "k_ht"),
        k_hd=hooks.DENSITY_FACTORS.number(s.density, "k_hd"),
        k_he=hooks.COATING_FACTORS.number(s.coating, "k_he"), l_hb=l_hb, d_b=d_b,
    )  # fmt: skip
    return HookLength(size, c_side, c_tail, c_top, tied, s_tie, l_hb, l_dh)


def ties_stand(designed: Designed, support: int) -> bool:
    """Tell whether ties stand around hooks of small cover at an end: laid, or given as built."""
    return not designed.as_built or support in designed.hook_ties


def _tie_spacing_apart(designed: Designed, d_b: float) -> float:
    """Return the spacing of ties around hooks; on whole mm where the step leaves no clear space."""
    stepped, whole = tie_spacing(d_b), float(math.floor(3 * d_b))
    given = {
        "d_bs": BARS.number(designed.basis.stirrups.size, "d_b"),
        "a_max": designed.strengths.a_max,
    }
    clear = (s for s in (stepped, whole) if holds(hooks.TIES_CLEAR, s_tie=s, **given))
    return next(clear, stepped)


def tie_spacing(d_b: float) -> float:
    """Return the spacing of ties around hooks: three bar diameters, down to a step of 5 mm."""
    return max(TIE_STEP, 3 * d_b // TIE_STEP * TIE_STEP)


def ties_at(designed: Designed, runs: Iterable[BarRun], support: int) -> float:
    """Return the spacing of the ties around the hooks of the web in an end support [mm].

    0 where none are. Hooks in the overhangs stand outside them.
    """
    sizes = {run.size for run in runs if run.bent_at(support) and not run.outside}
    found = [hook_at(designed, support, size) for size in sizes]
    return min((hook.s_tie for hook in found if hook.tied), default=0.0)


def has_hooks(designed: Designed) -> bool:
    """Tell whether hooks can be calculated in the edition of the pair."""
    return designed.pair.concrete != "CSA A23.3:24"


def available(designed: Designed, support: int) -> float:
    """Return the length from the inner face of an end support to the end of the bars."""
    return value(
        hooks.AVAILABLE, b_sp=designed.outline.supports[support - 1].width, c_end=designed.end_cover
    )


def hook_leg_fits(designed: Designed, support: int, size: str) -> bool:
    """Tell whether the leg of a hook has room in the depth at an end of the beam."""
    outline = designed.outline
    depth = outline.depths[0 if support == 1 else -1]
    d_bs = BARS.number(designed.basis.stirrups.size, "d_b")
    return hook_leg(size, WIDEST_BENDS) <= depth - 2 * (outline.cover + d_bs)


def hook_part(designed: Designed, support: int, size: str, *, outside: bool = False) -> float:
    """Return the part of the strength of bars that their hooks develop at the inner face.

    0 where a hook has no room in the depth or not its least length, below which no steel in excess
    lets it count (12.5.1), and in an edition whose hooks cannot be calculated.
    """
    if not has_hooks(designed):
        return 0.0
    if not hook_leg_fits(designed, support, size):
        return 0.0
    l_av = available(designed, support)
    if not holds(hooks.FITS, d_b=BARS.number(size, "d_b"), l_av=l_av):
        return 0.0
    return min(l_av / hook_at(designed, support, size, outside=outside).l_dh, 1.0)


def fits_hook(designed: Designed, support: int, size: str, *, outside: bool = False) -> bool:
    """Tell whether a hook of a size has room in the depth and is developed at the inner face."""
    return hook_part(designed, support, size, outside=outside) >= 1
