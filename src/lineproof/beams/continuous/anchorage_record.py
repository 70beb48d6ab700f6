"""Recorded: development lengths of all bars, step by step, and what the other parts rest on."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from decimal import Decimal
from typing import Literal

from lineproof.beams.continuous.anchorage import (
    COVERED_ROW,
    OTHER_ROW,
    TOP_ROW,
    UNCOVERED_ROW,
    Bar,
    bar_of,
    holds,
    room_beside,
    sides_of,
    tie_spacing,
    ties_row,
    ties_stand,
)
from lineproof.beams.continuous.detailing_data import Designed, ShearStretch
from lineproof.beams.continuous.forces import Demand, End
from lineproof.beams.continuous.layout import BarRun
from lineproof.beams.steps import Steps
from lineproof.quantity import Typed
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import bars as bar_clause
from lineproof.standards.a23_3 import cover, development, hooks, laps, minimum
from lineproof.standards.a23_3.bars import BARS, STIRRUP_BENDS

BY_TABLE = "The development length is that of the table; the general expression stands beside it."
BY_GENERAL = "The development length is that of the general expression; the table stands beside it."

_OUTSIDE = "In the overhangs bars stand outside the ties: the factor for ties is not used."
_BESIDE = (
    "The corner bars of the beam lie beside the column, which is narrower: their hooks are NOT "
    "anchored in it. Whether the joint takes them is NOT checked here; its design must show it."
)
TIED_IN_WEB = "Ties around the hooks within the web, of small cover where the beam ends"
_NO_TIES = (
    "Where the cover is so small, ties must stand around the hooks. Bars and stirrups are those "
    "given, and no such ties are given (hook_ties): none are laid or counted. Whether they stand "
    "there is NOT checked here; the calculation lists it as not covered."
)
TIES_IN_JOINT = (
    "The hooks of the bars in the overhangs stand outside the ties of the beam and are NOT tied "
    "here: the design of what carries the beam must show ties around them in the joint, at most "
    "{:g} mm apart."
)


def plain(value: float, unit: str) -> str | Typed:
    """Return a number as it is typed, with 12 digits at most; lengths are read already."""
    text = f"{value:.12g}"
    if unit != "mm" or "e" in text:
        return f"{text} {unit}".strip()
    return Typed(f"{text} mm", text, "mm", Decimal(text), float(text))


def forces_as_given(steps: Steps, demand: Demand, near: End, x: Entry | None = None) -> None:
    """Record moment and shear of a case as given numbers; another chapter derives them."""
    del near, x
    sheet = steps.sheet
    source = f"analysis, {demand.case}"
    M_f = sheet.given("M_f", plain(abs(demand.M) / 1e6, "kN.m"), source=source)
    V_f = sheet.given("V_f", plain(abs(demand.V) / 1e3, "kN"), source=source)
    steps.bind(M_f=M_f, V_f=V_f)


Resisting = Literal["V_r", "V_s", "theta"]


def record_stretch(steps: Steps, stretch: ShearStretch, names: Sequence[Resisting]) -> None:
    """Record those of V_r, V_s and theta of a stretch that are asked for, and bind them."""
    values = {
        "V_r": plain(stretch.V_r / 1e3, "kN"),
        "V_s": plain(stretch.V_s / 1e3, "kN"),
        "theta": plain(stretch.theta, "deg"),
    }
    where = f"{stretch.start / 1000:.2f} to {stretch.end / 1000:.2f} m from support 1"
    alone = ", taken by itself: on the safe side" if len(names) > 1 else ""
    for name in names:
        case = f", in {stretch.cases[name]}" if name in stretch.cases else ""
        source = f"shear chapter, the smallest of all load cases{case}; {where}{alone}"
        steps.bind(**{name: steps.sheet.given(name, values[name], source=source)})


@dataclass(frozen=True, eq=False)
class Writers:
    """How other chapters record what anchorage rests on.

    ``span`` gives the entries of a span (h, l, l_n, b_f, b_o); ``forces`` records M_f and V_f of
    a demand and binds them; ``shear`` those asked for of V_r, V_s and theta of a stretch.
    ``torsion`` records the torsion of a demand at the face of a support and binds T_f, p_h, A_o.
    ``section`` returns the entries of a section of shear by span, case and column of its check; it
    is recorded in a part of the key given where it is not yet.
    """

    sheet: Sheet
    designed: Designed
    span: Callable[[int], Mapping[str, Entry]]
    forces: Callable[[Steps, Demand, End, Entry | None], None] = forces_as_given
    shear: Callable[[Steps, ShearStretch, Sequence[Resisting]], None] = record_stretch
    sizes: Mapping[str, Mapping[str, Entry]] = field(default_factory=dict)
    """Diameters and areas recorded for a face: ``d_b 25M``, ``A_b 25M``, and ``d_bs``."""
    torsion: Callable[[Steps, Demand, End], None] | None = None
    section: Callable[[int, int, int, str], Mapping[str, Entry]] | None = None


Lengths = Mapping[Bar, Mapping[str, Entry]]
"""Recorded entries (l_d0, l_d, l_s, d_b, A_b, ...) of every bar whose development is recorded."""


def place_of(writers: Writers, span: int) -> dict[str, Entry]:
    """Return the entries of a span that symbols stand for."""
    entries = writers.span(span)
    names = ("h", "l", "l_n", "b_f", "b_o")
    return {name: entries[name] for name in names if name in entries}


def record_lengths(writers: Writers, runs: Iterable[BarRun]) -> Lengths:
    """Record the development length of every kind of bar in a part of its own."""
    designed = writers.designed
    made: dict[Bar, Mapping[str, Entry]] = {}
    kept = [run for run in runs if run.place != "side face"]
    for run in sorted(kept, key=lambda r: (r.face, r.place, r.size)):
        bar = bar_of(designed, run)
        if bar not in made:
            made[bar] = _record_bar(writers, bar, len(made) + 1)
    return made


def sizes_of(lengths: Lengths) -> dict[str, dict[str, Entry]]:
    """Return diameters and areas of the bars of each face whose development is recorded, d_bs."""
    made: dict[str, dict[str, Entry]] = {}
    for bar, entries in lengths.items():
        own = made.setdefault(bar.face, {})
        own[f"d_b {bar.size}"], own[f"A_b {bar.size}"] = entries["d_b"], entries["A_b"]
        own["d_bs"] = entries["d_bs"]
    return made


def _record_bar(writers: Writers, bar: Bar, number: int) -> dict[str, Entry]:
    where = "in the overhang" if bar.place == "overhang" else f"{bar.number} in a layer"
    title = f"Development of {bar.face} bars {bar.size}, {where}"
    with writers.sheet.part(f"anchorage-bar-{number}", title):
        steps = Steps(writers.sheet, _deep(writers, bar))
        _record_geometry(steps, writers.designed, bar)
        _record_factors(steps, writers.designed, bar)
        _record_expressions(steps, writers.designed, bar)
        steps.lines(development.L_D, laps.CLASS_B)
    return steps.place


def _deep(writers: Writers, bar: Bar) -> dict[str, Entry]:
    """Return the entries of the span whose depth the bar was developed in."""
    outline = writers.designed.outline
    spans = [k for k, h in enumerate(outline.depths, start=1) if h == bar.h]
    if bar.place == "overhang" and bar.room > 0:
        spans.sort(key=lambda k: abs(room_beside(writers.designed, [k]) - bar.room))
    return place_of(writers, spans[0])


def _record_geometry(steps: Steps, designed: Designed, bar: Bar) -> None:
    sheet, stirrup = steps.sheet, designed.basis.stirrups.size
    steps.bind(
        d_bs=sheet.lookup("d_bs", BARS, stirrup, "d_b"),
        d_b=sheet.lookup("d_b", BARS, bar.size),
        A_b=sheet.lookup("A_b", BARS, bar.size),
    )
    steps.line(cover.COVER_TO_BARS)
    if bar.place == "overhang":
        each = bar.number / sides_of(designed.outline)
        steps.line(minimum.SPREAD_WIDTH)
        steps.bind(n_o=sheet.given("n_o", plain(each, ""), source="as laid"))
        steps.line(development.CLEAR_OVERHANG)
        return
    steps.bind(
        r_s=sheet.lookup("r_s", STIRRUP_BENDS, stirrup),
        n_b=sheet.given("n_b", str(bar.number), source="the fullest layer that the bars pass"),
    )
    steps.line(bar_clause.CLEAR)


def _record_factors(steps: Steps, designed: Designed, bar: Bar) -> None:
    sheet, row = steps.sheet, OTHER_ROW
    if bar.face == "top":
        deep = steps.entry("h_f") if bar.place == "overhang" else steps.entry("h")
        steps.line(development.FRESH_BELOW, h=deep)
        row = TOP_ROW if steps.decide(development.TOP_BAR) else OTHER_ROW
    coating = development.UNCOATED
    if designed.strengths.coating != development.UNCOATED:
        covered = steps.decide(development.COATED_COVERED)
        apart = steps.decide(development.COATED_SPACED)
        coating = development.COATED if covered and apart else development.COATED_CLOSE
    steps.bind(
        k_1=sheet.lookup("k_1", development.LOCATION, row),
        k_2=sheet.lookup("k_2", development.COATING, coating),
        k_3=sheet.lookup("k_3", development.DENSITY, designed.strengths.density),
        k_4=sheet.lookup("k_4", development.SIZE, bar.size),
    )


def _record_expressions(steps: Steps, designed: Designed, bar: Bar) -> None:
    """Record both expressions, that in use as l_d0; bars in an overhang have the table alone."""
    sheet = steps.sheet
    by_general = designed.basis.expression == "general" and bar.place == "web"
    if bar.place == "web":
        sheet.note("expression", BY_GENERAL if by_general else BY_TABLE, title="Expression in use")
        _record_general(steps, designed, "l_d0" if by_general else "l_d0g")
    _record_table(steps, designed, bar, "l_d0t" if by_general else "l_d0")


def _record_general(steps: Steps, designed: Designed, symbol: str) -> None:
    sheet, stirrups = steps.sheet, designed.basis.stirrups
    steps.lines(development.CENTRES, development.TO_SURFACE, development.D_CS)
    if math.isinf(stirrups.spacing):
        steps.bind(
            K_tr=sheet.given("K_tr", "0 mm", source="stirrups do not stand all along the beam")
        )
        steps.line(development.GENERAL, symbol)
        return
    spacing = sheet.given("s", plain(stirrups.spacing, "mm"), source="largest along the beam")
    steps.bind(
        n_v=sheet.given("n_v", str(stirrups.legs), source="as laid"),
        A_bs=sheet.lookup("A_bs", BARS, stirrups.size, "A_b"),
        s=spacing,
        f_yt=steps.entry("f_y"),
        n_d=steps.entry("n_b"),
    )
    steps.lines(development.A_TR, development.K_TR)
    steps.line(development.GENERAL, symbol)


def _record_table(steps: Steps, designed: Designed, bar: Bar, symbol: str) -> None:
    covered = bool(steps.decide(development.COVERED))
    if bar.place == "overhang":
        apart = bool(steps.decide(development.SPACED_SLAB))
    elif designed.basis.stirrups.minimum:
        apart = bool(steps.decide(development.SPACED))
    else:
        apart = False
        steps.sheet.note(
            "no-minimum-stirrups",
            "There are no minimum stirrups all along: the longer expression.",
            title="Stirrups",
            clause="12.2.3",
        )
    steps.line(development.SHORT if covered and apart else development.LONG, symbol)


def record_hook(
    writers: Writers,
    place: Mapping[str, Entry],
    support: int,
    size: str,
    ties: float,
    *,
    outside: bool = False,
) -> dict[str, Entry]:
    """Record inside the open part the hook of a bar at an end of the beam, with its checks.

    ``ties`` is the spacing at which ties are laid around all hooks of the web at the support [mm];
    ``outside`` says that the bars stand in the overhangs, outside these ties.
    Raises :class:`UserError` for an edition whose hooks cannot be calculated.
    """
    sheet, designed = writers.sheet, writers.designed
    basic = hooks.basic_length(designed.pair)
    steps = Steps(sheet, place)
    steps.bind(
        d_bs=sheet.lookup("d_bs", BARS, designed.basis.stirrups.size, "d_b"),
        d_b=sheet.lookup("d_b", BARS, size),
    )
    breadth = designed.breadths.get(support, designed.outline.b_w)
    if breadth != designed.outline.b_w:
        steps.bind(b_col=sheet.given("b_col", plain(breadth, "mm"), source="column"))
        steps.line(hooks.SIDE_COVER_COLUMN)
    else:
        steps.line(hooks.SIDE_COVER)
    if steps.entry("c_side").value < 0:
        sheet.note("beside-the-column", _BESIDE, title="Hooks of the corner bars", clause="12.5")
    steps.bind(c_tail=sheet.given("c_tail", plain(designed.c_tail, "mm"), source="as laid"))
    steps.line(hooks.FACE_COVER)
    side, tail = steps.decide(hooks.SIDE_COVERED), steps.decide(hooks.TAIL_COVERED)
    face = steps.decide(hooks.FACE_COVERED)
    asked = not (side and face)
    tied = asked and ties_stand(designed, support)
    close = holds(hooks.TIED, s_tie=ties, d_b=steps.entry("d_b").value)
    reduced = bool(side and tail) and steps.holds(laps.LAPPABLE)
    if tied and outside:
        sheet.note("outside", _OUTSIDE, title="Ties around the hooks", clause="12.5.3")
    row = ties_row(side=bool(side), face=bool(face), tied=tied and close and not outside)
    _record_hook_factors(steps, designed, reduced=reduced, ties=row)
    steps.lines(basic, hooks.L_DH)
    if tied:
        _record_ties(steps, designed, ties, outside=outside)
    elif asked:
        sheet.note("no-ties", _NO_TIES, title="Ties around the hooks", clause="12.5.4")
    return steps.place


def _record_ties(steps: Steps, designed: Designed, ties: float, *, outside: bool) -> None:
    """Record the ties around hooks of the web; those of the overhangs are left to the joint."""
    if outside:
        text = TIES_IN_JOINT.format(tie_spacing(steps.entry("d_b").value))
        steps.sheet.note("ties-in-joint", text, title="Hooks in the overhangs", clause="12.5.4")
        return
    source = "as built" if designed.as_built else "as laid"
    steps.bind(s_tie=steps.sheet.given("s_tie", plain(ties, "mm"), source=source))
    steps.check(hooks.TIED, title=TIED_IN_WEB if sides_of(designed.outline) else "")
    steps.check(hooks.TIES_CLEAR, a_max=steps.sheet.find("a_max"))


def _record_hook_factors(steps: Steps, designed: Designed, *, reduced: bool, ties: str) -> None:
    sheet = steps.sheet
    covered = COVERED_ROW if reduced else UNCOVERED_ROW
    steps.bind(
        k_hc=sheet.lookup("k_hc", hooks.COVER_FACTORS, covered),
        k_ht=sheet.lookup("k_ht", hooks.TIE_FACTORS, ties),
        k_hd=sheet.lookup("k_hd", hooks.DENSITY_FACTORS, designed.strengths.density),
        k_he=sheet.lookup("k_he", hooks.COATING_FACTORS, designed.strengths.coating),
    )
