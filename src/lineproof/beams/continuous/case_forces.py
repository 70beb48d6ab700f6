"""The forces of one load case at one place, as lines: loads, support moments, shear, moment.

Everything is seen from the nearer of the two supports of the span, so that lines at its right end
read like those at its left end. Points on the way are measured from that support's axis.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.continuous.forces import Demand, End, other
from lineproof.beams.continuous.groups import Group, groups_of, moment_name, named
from lineproof.beams.continuous.imported_case import record_imported, signed
from lineproof.beams.continuous.model import ANALYSIS, GIVEN, Model, SingleLoad
from lineproof.beams.continuous.symbols import code, stated
from lineproof.beams.steps import Steps
from lineproof.record import Entry

NEAR = 1e-6
"""Distance within which a station and a load are at the same place [mm]."""
_ROUNDED, _LEAST = 1e-4, 1e6
"""Part by which lines may differ from the analysis, and the least M or V it is of [N.mm, N]."""
_NO_MOMENT = 1.0
"""Size below which a moment is none but for round-off, and no face is in tension [N.mm]."""


@dataclass(frozen=True, slots=True)
class Names:
    """Symbols of a case on a span: load, moments at the near and far axis, shear, place, moment.

    ``V`` is the shear at the section, "" where none is asked for.
    """

    w: str
    near: str
    far: str
    shear: str
    x: str
    M: str
    V: str = ""


FACTORED = Names("w_f", "M_sn", "M_sf", "V_sn", "x_f", "M_f", "V_f")
SPECIFIED = Names("w_s", "M_qn", "M_qf", "V_qn", "x_q", "M_s")


@dataclass(frozen=True, slots=True)
class CaseOnSpan:
    """A load case on one span: factors by load type where they act, and by group everywhere."""

    span: int
    near: End
    on_span: Mapping[str, float]
    by_group: Mapping[Group, float]


def case_on_span(model: Model, demand: Demand, near: End) -> CaseOnSpan:
    """Return what a case puts on a span and elsewhere."""
    factors = model.forces.factors_of(demand.row)
    on_span = {kind: f for (kind, span), f in factors.items() if span == demand.span}
    by_group: dict[Group, float] = {}
    for (kind, span), f in factors.items():
        by_group[Group(kind, span if kind in LIVE else 0)] = f
    known = groups_of(model)
    return CaseOnSpan(demand.span, near, on_span, {g: by_group[g] for g in known if g in by_group})


def record_forces(
    steps: Steps, model: Model, demand: Demand, near: End, *, x: Entry | None = None
) -> None:
    """Record inside the open part M_f and V_f of one case, and bind both.

    ``x`` is the distance of the section from the near support axis; left out, it is recorded as
    the place where the shear is zero. M_f and V_f are sizes, positive; which face is in tension
    stands in the title.
    """
    if model.imported is not None:
        record_imported(steps, model, demand, near, x=x)
        return
    _record(steps, model, demand, near, x=x, names=FACTORED)


def record_specified_moment(
    steps: Steps, model: Model, demand: Demand, near: End, *, x: Entry | None = None
) -> None:
    """Record inside the open part M_s of a case of specified loads, and bind it.

    ``model`` is that under specified loads. ``x`` as for factored loads.
    """
    _record(steps, model, demand, near, x=x, names=SPECIFIED)


def _record(
    steps: Steps, model: Model, demand: Demand, near: End, *, x: Entry | None, names: Names
) -> None:
    case = case_on_span(model, demand, near)
    lines = _Lines(steps, model, demand, case, names)
    lines.record_ends()
    if x is None:
        x = lines.record_zero_shear()
    steps.bind(**{names.x: x})
    lines.record_section(x)
    _stop_unless_same(steps, demand, names)


def _stop_unless_same(steps: Steps, demand: Demand, names: Names) -> None:
    """Stop where the lines give another moment or shear than that of the demand they stand for."""
    for symbol, size in ((names.M, abs(demand.M)), (names.V, abs(demand.V))):
        if symbol and abs(steps.entry(symbol).value - size) > _ROUNDED * max(size, _LEAST):
            msg = f"{demand}: {symbol} is recorded as {steps.entry(symbol).value!r}"
            raise AssertionError(msg)


def factor_text(factor: float) -> str:
    """Return a load factor as the code prints it: 1.25, 1.5, 1.0."""
    text = f"{factor:.12g}"
    return text if "." in text else f"{text}.0"


class _Lines:
    """The lines of one case on one span."""

    def __init__(
        self, steps: Steps, model: Model, demand: Demand, case: CaseOnSpan, of: Names
    ) -> None:
        self.of = of
        self.steps, self.model, self.demand, self.case = steps, model, demand, case
        self.title = str(demand.case)
        self.loads = [
            (factor_text(case.on_span[load.kind]), load)
            for load in model.on_span(demand.span)
            if load.kind in case.on_span
        ]
        self.names: dict[str, Entry] = {"l": model.lengths[demand.span - 1]}
        for _, load in self.loads:
            self.names |= load.entries

    @property
    def _own(self) -> tuple[str, ...]:
        """Symbols of lines of this case that its other lines rest on."""
        of = self.of
        return of.x, of.w, of.near, of.far, of.shear

    @property
    def hangs(self) -> bool:
        """Whether the span is a cantilever."""
        return self.model.forces.beam.cantilever(self.case.span)

    def _line(self, text: str, title: str) -> Entry:
        scope = self.names | {n: e for n, e in self.steps.place.items() if n in self._own}
        made = self.steps.sheet.line(stated(text), title=title, **named(scope, text))
        self.steps.place[made.symbol] = made
        return made

    def record_ends(self) -> None:
        """Record the load on the span, the moments at both axes and the shear at the near one."""
        span, near = self.case.span, self.case.near
        terms = []
        for kind, factor in self.case.on_span.items():
            name = f"w_{code(kind)}{span}"
            if (kind, span) in self.model.uniform:
                self.names[name] = self.model.uniform[kind, span]
                terms.append(f"{factor_text(factor)}*{name}")
        self.uniform = bool(terms)
        if terms:
            self._line(f"{self.of.w} = {' + '.join(terms)}", f"Load on span {span}: {self.title}")
        self.near_moment = self._moment(self.of.near, near)
        self.far_moment = self._moment(self.of.far, other(near))
        self._record_shear()

    def _moment(self, symbol: str, end: End) -> bool:
        """Record the moment of the case at one axis; tell whether there is one."""
        terms = []
        entries = self.model.sheet.entries_of(ANALYSIS)
        for group, factor in self.case.by_group.items():
            name = moment_name(self.model, group, self.case.span, end)
            if name and entries[name].value != 0:
                self.names[name] = entries[name]
                terms.append(f"{factor_text(factor)}*{name}")
        if not terms:
            return False
        support = self.case.span if end == "left" else self.case.span + 1
        total, what = " + ".join(terms), f"Moment at the axis of support {support}, this case"
        if self.model.forces.reduced(support, self.demand.row):
            self.names[f"p_{support}"] = self.model.sheet.entry(f"{GIVEN}/p_{support}")
            total, what = f"(1 - p_{support}/100)*({total})", f"{what}, redistributed"
        self._line(f"{symbol} = {total}", what)
        return True

    def _at(self, load: SingleLoad) -> str:
        """Return where a point load acts, from the near axis."""
        name = f"a_x{load.number}"
        return name if self.case.near == "left" else f"(l - {name})"

    def _ends(self, load: SingleLoad) -> tuple[str, str]:
        """Return where a load over part of the span begins and ends, from the near axis."""
        s, e = f"s_x{load.number}", f"e_x{load.number}"
        return (s, e) if self.case.near == "left" else (f"(l - {e})", f"(l - {s})")

    def _place(self, load: SingleLoad) -> tuple[float, float]:
        """Return begin and end of a load from the near axis [mm]; a point load has both alike."""
        length = self.model.lengths[load.span - 1].value
        first, last = (load.at, load.at) if load.at is not None else (load.start, load.end)
        if first is None or last is None:
            msg = f"load {load.number} has no place"
            raise ValueError(msg)
        if self.case.near == "left":
            return first.value, last.value
        return length - last.value, length - first.value

    def _record_shear(self) -> None:
        support = self.case.span if self.case.near == "left" else self.case.span + 1
        of, near, far = self.of, self.near_moment, self.far_moment
        terms = ([f"{of.w}*l"] if self.hangs else [f"{of.w}*l/2"]) if self.uniform else []
        for factor, load in self.loads:
            n = load.number
            if load.at is not None:
                share = "" if self.hangs else f"*(l - {self._at(load)})/l"
                terms.append(f"{factor}*P_x{n}{share}")
            else:
                s, e = self._ends(load)
                share = "" if self.hangs else f"*(l - ({s} + {e})/2)/l"
                terms.append(f"{factor}*w_x{n}*({e} - {s}){share}")
        if not self.hangs and (near or far):
            both = f"({of.far} - {of.near})/l"
            terms.append(both if near and far else f"{of.far}/l" if far else f"-{of.near}/l")
        text = " + ".join(terms).replace("+ -", "- ") or f"0*{of.w}*l"
        self._line(f"{of.shear} = {text}", f"Shear at the axis of support {support}, this case")

    def _passed(self, x: float) -> list[tuple[str, SingleLoad, bool]]:
        """Return the single loads between the near axis and x; True: x stands within the load."""
        made = []
        for factor, load in self.loads:
            begin, end = self._place(load)
            reached = begin < x - NEAR or (load.at is not None and self._counted(begin, x))
            if reached:
                made.append((factor, load, end > x + NEAR))
        return made

    def _counted(self, at: float, x: float) -> bool:
        """Tell whether a point load at the section itself lies before it: on the side asked for."""
        if abs(at - x) > NEAR:
            return at < x
        return self.demand.side == ("right" if self.case.near == "left" else "left")

    def record_zero_shear(self) -> Entry:
        """Record the place of zero shear, seen from the near axis."""
        length = self.model.lengths[self.case.span - 1].value
        at = self.demand.x if self.case.near == "left" else length - self.demand.x
        under = [load for _, load in self.loads
                 if load.at is not None and abs(self._place(load)[0] - at) <= NEAR]  # fmt: skip
        if under:
            title = "The largest moment stands under the point load"
            return self._line(f"{self.of.x} = {self._at(under[0])}", title)
        above, below = [self.of.shear], [self.of.w] if self.uniform else []
        for factor, load, within in self._passed(at):
            n = load.number
            if load.at is not None:
                above.append(f"- {factor}*P_x{n}")
                continue
            s, e = self._ends(load)
            if within:
                above.append(f"+ {factor}*w_x{n}*{s}")
                below.append(f"{factor}*w_x{n}")
            else:
                above.append(f"- {factor}*w_x{n}*({e} - {s})")
        top, bottom = " ".join(above), " + ".join(below)
        top = f"({top})" if len(above) > 1 else top
        bottom = f"({bottom})" if len(below) > 1 else bottom
        title = "Where the shear is zero, from the near axis"
        return self._line(f"{self.of.x} = {top}/{bottom}", title)

    def record_section(self, x: Entry) -> None:
        """Record M_f and V_f at the section."""
        moment, shear = self._section_terms(x.value)
        of = self.of
        V = self.demand.V if self.case.near == "left" else -self.demand.V
        top = self.demand.M < -_NO_MOMENT
        kind = "Negative" if top else "Positive"
        text = signed(moment, negative=top)
        self._line(f"{of.M} = {text}", f"{kind} moment at the section: {self.title}")
        if of.V:
            text = signed(shear, negative=V < 0)
            self._line(f"{of.V} = {text}", f"Shear at the section: {self.title}")

    def _section_terms(self, x: float) -> tuple[str, str]:
        of, at = self.of, self.of.x
        moment = [f"{of.near} + {of.shear}*{at}" if self.near_moment else f"{of.shear}*{at}"]
        shear = [of.shear]
        if self.uniform:
            moment.append(f"- {of.w}*{at}**2/2")
            shear.append(f"- {of.w}*{at}")
        for factor, load, within in self._passed(x):
            n = load.number
            if load.at is not None:
                moment.append(f"- {factor}*P_x{n}*({at} - {self._at(load)})")
                shear.append(f"- {factor}*P_x{n}")
                continue
            s, e = self._ends(load)
            if within:
                moment.append(f"- {factor}*w_x{n}*({at} - {s})**2/2")
                shear.append(f"- {factor}*w_x{n}*({at} - {s})")
            else:
                moment.append(f"- {factor}*w_x{n}*({e} - {s})*({at} - ({s} + {e})/2)")
                shear.append(f"- {factor}*w_x{n}*({e} - {s})")
        return " ".join(moment), " ".join(shear)
