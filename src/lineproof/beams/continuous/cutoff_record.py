"""Recorded: every cut-off point, the bars into the supports, the top bars past inflection."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from lineproof.beams.continuous.anchorage import bar_of, development_length
from lineproof.beams.continuous.anchorage_record import Lengths, Writers, plain
from lineproof.beams.continuous.cutoff import (
    Frame,
    Zone,
    along,
    extension_formula,
    local,
    shear_in_tension,
    support_of,
    thin,
    zone_at,
)
from lineproof.beams.continuous.cutoff_ends import Ending, Runs, SideOf
from lineproof.beams.continuous.cutoff_need import Need, need_of
from lineproof.beams.continuous.cutoff_sets import (
    begin,
    grouped,
    record_area,
    record_resistance,
    text_of,
)
from lineproof.beams.continuous.forces import Demand, End
from lineproof.beams.continuous.layout import BarRun, Face
from lineproof.beams.continuous.resistance_demand import stretch_at
from lineproof.beams.flexure import required
from lineproof.beams.steps import Steps, only
from lineproof.formula import COMMON_PRACTICE, Criterion, Formula
from lineproof.record import Entry
from lineproof.standards.a23_3 import cutoff as clause
from lineproof.standards.references import MECHANICS

NO_FURTHER_NEED = "Point of no further need, from the near support axis"
INFLECTION = "Point of inflection, from the near support axis"
ZERO_AT_AXIS = "Support axis, where the moment is zero"
_NONE = (
    "No bars go on: the bars may end only where no load case brings tension to the {face}, and "
    "past it."
)
_PAST = (clause.PAST_INWARD, clause.PAST_OUTWARD, clause.PAST_SUPPORT)
_CONTINUING = (
    clause.CONTINUING_INWARD,
    clause.CONTINUING_OUTWARD,
    clause.CONTINUING_PAST_SUPPORT,
)
_NO_SHIFT = (
    "Torsion counts in this span: no longer bars stand for what shear adds; the tension by moment, "
    "shear and torsion together is checked along the bars."
)


@dataclass(frozen=True, eq=False)
class Site:
    """One side of a section of bars while it is recorded.

    ``section`` holds A_s, d, d_v of all its bars; ``key`` and ``title`` are those of its parts.
    """

    writers: Writers
    frame: Frame
    lengths: Lengths
    side: SideOf
    section: dict[str, Entry]
    key: str
    title: str

    def demand(self, t: float, row: int) -> Demand:
        """Return the moment and shear of a case at a distance from the near axis."""
        side = self.side
        x = local(self.writers.designed, side.span, side.near, t)
        return self.writers.designed.forces.demand(side.span, x, side.near, row)

    def given(
        self, symbol: str, t: float, source: str = "as laid, lapped bars as one", title: str = ""
    ) -> Entry:
        """Record a distance from the near axis; "" for the title that the symbol has."""
        return self.writers.sheet.given(symbol, plain(t, "mm"), title, source=source)

    def bar(self, run: BarRun) -> Mapping[str, Entry]:
        """Return the recorded development of a run."""
        return self.lengths[bar_of(self.writers.designed, run)]

    def longest(self, runs: Runs) -> Mapping[str, Entry]:
        """Return the recorded development of the run that needs the longest one."""
        designed = self.writers.designed
        return self.bar(max(runs, key=lambda run: development_length(designed, run)))


def thickest(runs: Runs) -> BarRun:
    """Return the first of the runs with the largest diameter."""
    return max(runs, key=lambda run: run.diameter)


def side_key(face: Face, number: int, towards: End) -> str:
    """Return the key of the part of bars towards one end: below a span, or above a support."""
    return f"anchorage-{face}-{number}-{towards}"


def cut_key(side: str, index: int) -> str:
    """Return the key of the part of a cut, by that of its side and its place in the cuts."""
    return f"{side}-cut-{index + 1}"


def shear_key(cut: str) -> str:
    """Return the key of the part with the shear at a cut."""
    return f"{cut}-shear"


def record_cuts(site: Site) -> None:
    """Record every cut-off of the bars of one side, a part each."""
    for index in range(len(site.side.cuts)):
        _record_cut(site, index)


def _record_cut(site: Site, index: int) -> None:
    side, sheet = site.side, site.writers.sheet
    ending, continuing = side.cuts[index], side.continuing(index)
    key = cut_key(site.key, index)
    need = need_of(site.frame, side, index)
    zone = zone_at(
        site.writers.designed, side.face, side.span, side.near, ending.t, continuing, ending.runs
    )
    going = f"{text_of(continuing)} going on" if continuing else "none going on"
    with sheet.part(key, f"{site.title}: {text_of(ending.runs)} cut, {going}"):
        if need is None:
            _note_no_point(site)
        else:
            _record_point(site, index, need)
        if zone == "compression":
            _note_compression(site, ending.t)
        elif zone == "support":
            _note_in_support(site)
    if zone not in ("compression", "support"):
        record_zone(site, key, zone, ending, continuing)


def record_zone(
    site: Site, key: str, zone: Zone, ending: Ending, continuing: Sequence[BarRun]
) -> None:
    """Record the rule of 12.10.5 by which bars end in the tension zone; for "" a failing check."""
    if zone == "double area":
        _record_double_area(site, key, ending.t, continuing)
    else:
        _record_low_shear(site, key, ending)


def _record_point(site: Site, index: int, need: Need) -> None:
    side, sheet, designed = site.side, site.writers.sheet, site.writers.designed
    ending, continuing = side.cuts[index], side.continuing(index)
    if need.behind:
        _note_behind(site, need)
    steps = begin(site.writers, sheet, need.span, side.face)
    if continuing:
        record_area(steps, grouped(site.writers, continuing), "A_co")
        record_resistance(steps, site.writers, side.face)
        source = "found along the envelope; confirmed below"
    else:
        sheet.note("none-going-on", _NONE.format(face=side.face), title="Bars that go on")
        source = "found along the envelope"
    steps.bind(x_t=site.given("x_t", need.point.t, source, NO_FURTHER_NEED))
    x = local(designed, need.span, need.near, need.point.t)
    demand = designed.forces.demand(need.span, x, need.near, need.point.row)
    site.writers.forces(steps, demand, need.near, steps.entry("x_t"))
    if continuing:
        steps.check(clause.SUFFICES)
    record_extension(site, steps, need, ending.t, ending.runs)
    _record_continuing(site, steps, index, need)


def record_extension(site: Site, steps: Steps, need: Need, t: float, runs: Runs) -> Steps:
    """Record the extension past a point and its check; by d and d_v of the whole section."""
    formula = extension_formula(site.writers.designed, need.span)
    if "theta" in formula.names:
        _record_angle(site, steps, need.place(site.frame))
    else:
        site.writers.sheet.note("no-shift", _NO_SHIFT, title="Shear", clause="11.3.9.2")
    past = Steps(site.writers.sheet, steps.place | site.section)
    past.bind(x_e=site.given("x_e", t), d_b=site.bar(thickest(runs))["d_b"])
    past.line(formula)
    past.line(_of_need(site, need, _PAST))
    past.check(clause.EXTENDED, title=ends_before(clause.EXTENDED, past.entry("l_ext")))
    return past


def ends_before(test: Criterion, l_ext: Entry) -> str:
    """Return a title for a check of an extension that is negative, else ""."""
    if l_ext.value >= 0:
        return ""
    return f"{test.title}: the bars end {-l_ext.value:.0f} mm before it"


def _record_angle(site: Site, steps: Steps, place: float) -> None:
    """Bind theta: that of the shear design, 35 degrees where there is none."""
    designed = site.writers.designed
    stretch = stretch_at(designed, place)
    if designed.shear:
        site.writers.shear(steps, stretch, ("theta",))
    else:
        angle = site.writers.sheet.given("theta", plain(stretch.theta, "deg"), source="11.3.6.3")
        steps.bind(theta=angle)


def _of_need(site: Site, need: Need, formulas: tuple[Formula, Formula, Formula]) -> Formula:
    """Return the formula of a length: of bottom bars, of top bars, and from the span behind."""
    inward, outward, behind = formulas
    if need.behind:
        return behind
    return inward if site.side.face == "bottom" else outward


def _note_behind(site: Site, need: Need) -> None:
    side = site.side
    site.writers.sheet.note(
        "behind",
        f"In span {side.span} the bars that go on carry the moment alone. Those that end are for "
        f"span {need.span}: the point up to which they are needed is sought there; x_t is its "
        f"distance from the axis of support {support_of(side.span, side.near)}.",
        title="Point of no further need",
        clause="12.10.3",
        basis=MECHANICS,
    )


def _record_continuing(site: Site, steps: Steps, index: int, need: Need) -> None:
    """Record the length that the continuing bars need past the point (12.10.4)."""
    side = site.side
    if not side.continuing(index):
        return
    longest = site.longest(side.continuing(index))
    past = Steps(site.writers.sheet, steps.place | site.section)
    past.bind(**only(longest, ("d_b", "l_d")))
    past.bind(x_co=site.given("x_co", side.t_continuing(index)))
    past.line(clause.CONTINUING)
    past.line(_of_need(site, need, _CONTINUING))
    past.check(clause.CONTINUES)


def _note_no_point(site: Site) -> None:
    text = "The bars that go on carry the moment alone along the whole span."
    if site.side.face == "top":
        text = "The bars that go on do not carry the moment alone, not even at midspan."
    site.writers.sheet.note("no-point", text, title="Point of no further need", clause="12.10.3")


def _note_in_support(site: Site) -> None:
    site.writers.sheet.note(
        "in-support",
        f"The bars end between the faces of support {support_of(site.side.span, site.side.near)}, "
        "where no section in shear stands.",
        title="End of the bars",
        clause="12.10.5",
        basis=COMMON_PRACTICE,
    )


def _note_compression(site: Site, t: float) -> None:
    site.writers.sheet.note(
        "compression-zone",
        f"At {t:g} mm from the near support axis no load case puts the {site.side.face} in "
        "tension: the bars end in the compression zone.",
        title="End of the bars",
        clause="12.10.5",
        basis=COMMON_PRACTICE,
    )


def _rows_at(site: Site, t: float) -> tuple[int, int]:
    """Return the cases that govern at t: by moment, and by shear with the face in tension."""
    designed, side = site.writers.designed, site.side
    M, V = designed.forces.pairs(side.span, local(designed, side.span, side.near, t))
    M_face = M if side.face == "bottom" else -M
    return int(M_face.argmax()), int(shear_in_tension(M_face, V).argmax())


def _record_low_shear(site: Site, key: str, ending: Ending) -> None:
    t = ending.t
    with site.writers.sheet.part(shear_key(key), f"{site.title}: end in the tension zone"):
        steps = _at_end(site, t, _rows_at(site, t)[1])
        if not thin(ending.runs):
            steps.decide(clause.CUT_OF_THIN_BARS, d_b=site.bar(thickest(ending.runs))["d_b"])
        if site.writers.designed.shear:
            _resisting(site, steps, t).check(clause.CUT_AT_LOW_SHEAR)
        else:
            _fail_without_shear(site)


def _fail_without_shear(site: Site) -> None:
    """Record a check that fails: without a shear design no bar may end in a tension zone."""
    none = site.writers.sheet.given("V_r", "0 kN", source="no shear design")
    site.writers.sheet.check(clause.CUT_AT_LOW_SHEAR, V_r=none)


def _at_end(site: Site, t: float, row: int) -> Steps:
    """Record inside the open part the forces of a case at an end of bars."""
    side = site.side
    steps = begin(site.writers, site.writers.sheet, side.span, side.face)
    x = site.given("x_e", t)
    site.writers.forces(steps, site.demand(t, row), side.near, x)
    return steps


def _resisting(site: Site, steps: Steps, t: float) -> Steps:
    """Record inside the open part V_r at an end of bars; return the steps."""
    designed, side = site.writers.designed, site.side
    place = along(designed, side.span, side.near, t)
    site.writers.shear(steps, stretch_at(designed, place), ("V_r",))
    return steps


def _record_double_area(site: Site, key: str, t: float, continuing: Sequence[BarRun]) -> None:
    by_moment, by_shear = _rows_at(site, t)
    with site.writers.sheet.part(shear_key(key), f"{site.title}: shear at the end"):
        _resisting(site, _at_end(site, t, by_shear), t).check(clause.CUT_AT_MODERATE_SHEAR)
    with site.writers.sheet.part(f"{key}-area", f"{site.title}: steel at the end"):
        steps = _at_end(site, t, by_moment)
        A = record_area(steps, grouped(site.writers, continuing), "A_co")
        steps.bind(A_co=A)
        flanged = site.side.face == "bottom" and site.writers.designed.outline.h_f > 0
        required(steps, site.writers.designed.outline.shape if flanged else "rectangular")
        steps.check(clause.CUT_AT_DOUBLE_AREA)
