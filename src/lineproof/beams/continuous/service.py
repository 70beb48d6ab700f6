"""Service moments of a span as lines: sums of the support moments by load type, and statics.

For the deflections: hogging moments at the axes of the supports are positive here.
"""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.beams.analysis.arrangements import LIVE
from lineproof.beams.analysis.solve import Row
from lineproof.beams.continuous.case_forces import factor_text
from lineproof.beams.continuous.deflection_record import WORDS, Moments
from lineproof.beams.continuous.deflection_service import ServiceMoments, Stage
from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.groups import Group, moment_name, named
from lineproof.beams.continuous.model import ANALYSIS, LOADS, Model, SingleLoad
from lineproof.beams.continuous.symbols import code, stated
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.record import Entry
from lineproof.standards.a23_3.deflection_stages import HOGGING_SIZE

Factors = Mapping[Row, float]
BUILDING = "dead and construction load"
"""What the loads of the stage of construction are called."""


def service_lines(
    model: Model,
    service: ServiceMoments,
    behind: int | None,
    earlier: Mapping[str, Entry] | None = None,
) -> Moments:
    """Return what records the moments of a stage: of the span, or of a cantilever's root.

    ``behind`` is the span behind a cantilever, whose moments count as well; ``earlier`` binds the
    moments of a construction stage.
    """

    def record(steps: Steps, stage: Stage) -> None:
        span, factors = service.span, service.factors[stage]
        steps.bind(**dict(earlier or {}))
        if not service.free:
            _Lines(steps, model, factors, WORDS[stage], span).record_span(
                "M_h1", "M_h2", "M_m", "w_s"
            )
            return
        root: End = "right" if service.free == "left" else "left"
        _Lines(steps, model, factors, WORDS[stage], span).record_end(root, "M_h", "at the root")
        if behind is not None:
            lines = _Lines(steps, model, factors, WORDS[stage], behind)
            lines.record_behind("left" if service.free == "left" else "right")

    return record


def record_construction(steps: Steps, model: Model, span: int) -> dict[str, Entry]:
    """Record inside the open part the moments of the construction stage; return them by symbol.

    Dead load and the construction load on all spans. The moments by live load on single spans,
    all uniform, are scaled to the construction load. Raises :class:`UserError` where single live
    loads stand on the beam, which cannot be scaled.
    """
    if any(load.kind in LIVE for load in model.single):
        raise UserError(
            "construction_load: the moments of single live loads cannot be scaled to it; leave it "
            "out, or give the single live loads as dead load of a calculation of that stage"
        )
    lines = _Lines(steps, model, {("D", k): 1.0 for k in range(1, model.spans + 1)}, BUILDING, span)
    return lines.record_earlier()


def record_at(
    steps: Steps,
    model: Model,
    factors: Factors,
    words: str,
    *,
    span: int,
    x: Entry,
    earlier: Mapping[str, Entry] | None = None,
) -> Entry:
    """Record inside the open part the moment of a stage at a place of a span; return it.

    ``x`` is the distance from the left axis; the moment is a size, positive. ``earlier`` has the
    moments of a construction stage, which are then those of the ends.
    """
    lines = _Lines(steps, model, factors, words, span)
    return lines.record_at(x, earlier or {})


class _Lines:
    """The moments of one stage on one span."""

    def __init__(self, steps: Steps, model: Model, factors: Factors, words: str, span: int) -> None:
        self.steps, self.model, self.span, self.words = steps, model, span, words
        self.on_span = {kind: f for (kind, k), f in factors.items() if k == span and f}
        self.by_group = {
            Group(kind, k if kind in LIVE else 0): f for (kind, k), f in factors.items() if f
        }
        self.names: dict[str, Entry] = {"l": model.lengths[span - 1]}

    def _line(self, text: str, unit: str, title: str) -> Entry:
        made = self.steps.sheet.line(
            stated(text, unit=unit), title=f"{title}, {self.words}", **named(self.names, text)
        )
        self.names[made.symbol] = made
        self.steps.bind(**{made.symbol: made})
        return made

    def record_end(self, end: End, symbol: str, where: str) -> None:
        """Record the hogging moment at one axis."""
        entries = self.model.sheet.entries_of(ANALYSIS)
        terms = []
        for group, factor in self.by_group.items():
            name = moment_name(self.model, group, self.span, end)
            if name:
                self.names[name] = entries[name]
                terms.append(_times(factor, name))
        text = f"-({' + '.join(terms)})" if terms else "0*w_s*l**2"
        self._line(f"{symbol} = {text}", "kN.m", f"Negative moment {where}")

    def record_span(self, left: str, right: str, middle: str, load: str) -> None:
        """Record load, hogging moments at both axes and the moment at midspan."""
        self._record_load(load)
        ends = []
        sides: tuple[tuple[End, str], ...] = (("left", left), ("right", right))
        for end, symbol in sides:
            if self._any(end):
                self.record_end(end, symbol, f"at the {end} support")
                ends.append(symbol)
        terms = [f"{load}*l**2/8"] if load in self.names else []
        terms += [self._at_middle(load_) for load_ in self._single()]
        terms += [f"-({' + '.join(ends)})/2"] if ends else []
        text = f"{middle} = {' + '.join(terms)}".replace("+ -", "- ")
        self._line(text, "kN.m", "Moment at midspan")

    def record_behind(self, free: End) -> None:
        """Record moments of the span behind a cantilever: at midspan and at the root."""
        root: End = free
        names = {root: "M_hb", ("right" if root == "left" else "left"): "M_ho"}
        self.record_span(names["left"], names["right"], "M_mb", "w_sb")

    def record_earlier(self) -> dict[str, Entry]:
        """Record moments of dead load and a load per length ``w_cn`` on all spans.

        Of a cantilever that at its root alone.
        """
        w_cn = self.model.sheet.entry(f"{LOADS}/w_cn")
        self.names["w_cn"] = w_cn
        ends = []
        sides: tuple[tuple[End, str], ...] = (("left", "M_ae1"), ("right", "M_ae2"))
        if self.model.forces.beam.cantilever(self.span):
            root: End = "left" if self.model.inputs.supports[self.span].kind == "free" else "right"
            made = self._earlier_end(root, "M_ae1", "at the root")
            return {made.symbol: made}
        for end, symbol in sides:
            if self._any(end):
                ends.append(self._earlier_end(end, symbol, f"at the {end} support"))
        w_D = f"w_D{self.span}"
        self.names[w_D] = self.model.uniform["D", self.span]
        terms = [f"({w_D} + w_cn)*l**2/8", *(self._at_middle(load) for load in self._single())]
        terms += [f"-({' + '.join(e.symbol for e in ends)})/2"] if ends else []
        text = f"M_aem = {' + '.join(terms)}".replace("+ -", "- ")
        middle = self._line(text, "kN.m", "Moment at midspan")
        return {entry.symbol: entry for entry in (*ends, middle)}

    def _earlier_end(self, end: End, symbol: str, where: str) -> Entry:
        """Record the hogging moment of dead load and w_cn at one axis."""
        entries, kind = self.model.sheet.entries_of(ANALYSIS), self.model.inputs.live_kind
        dead = moment_name(self.model, Group("D", 0), self.span, end)
        self.names[dead] = entries[dead]
        terms = []
        for k in range(1, self.model.spans + 1):
            name = moment_name(self.model, Group(kind, k), self.span, end)
            if name:
                load = f"w_{code(kind)}{k}"
                self.names |= {name: entries[name], load: self.model.uniform[kind, k]}
                terms.append(f"{name}/{load}")
        text = f"{symbol} = -({dead} + w_cn*({' + '.join(terms)}))"
        return self._line(text, "kN.m", f"Negative moment {where}")

    def record_at(self, x: Entry, earlier: Mapping[str, Entry]) -> Entry:
        """Record the moment at a place from the loads and the moments at the axes; its size."""
        self.names["x_f"] = x
        load, names = "w_s", ("M_h1", "M_h2")
        if earlier:
            load, names = f"(w_D{self.span} + w_cn)", ("M_ae1", "M_ae2")
            self.names |= {
                f"w_D{self.span}": self.model.uniform["D", self.span],
                "w_cn": self.model.sheet.entry(f"{LOADS}/w_cn"), **earlier,
            }  # fmt: skip
        else:
            self._record_load(load)
        load = load if earlier or load in self.names else ""
        if self.model.forces.beam.cantilever(self.span):
            terms = self._hanging(x.value, load)
        else:
            terms = self._simple(x.value, load) + self._from_ends(names, known=bool(earlier))
        text = " + ".join(terms).replace("+ -", "-")
        made = self._line(f"M_s = {text}", "kN.m", "Moment at this place, with its sign")
        return made if made.value >= 0 else self.steps.line(HOGGING_SIZE, M_s=made)

    def _from_ends(self, names: tuple[str, str], *, known: bool) -> list[str]:
        """Return what the hogging moments at both axes take away at x_f; record them first."""
        sides: tuple[tuple[End, str, str], ...] = (
            ("left", names[0], "(l - x_f)"), ("right", names[1], "x_f"),
        )  # fmt: skip
        for end, symbol, _ in sides:
            if not known and self._any(end):
                self.record_end(end, symbol, f"at the {end} support")
        return [f"-{name}*{arm}/l" for _, name, arm in sides if name in self.names]

    def _simple(self, x: float, load: str) -> list[str]:
        """Return what the loads give at x_f of the simple span."""
        terms = [f"{load}*x_f*(l - x_f)/2"] if load else []
        for single in self._single():
            n, factor = single.number, factor_text(self.on_span[single.kind])
            self.names |= single.entries
            if single.at is not None:
                a = f"a_x{n}"
                arms = f"(l - {a})*x_f" if single.at.value >= x else f"{a}*(l - x_f)"
                terms.append(f"{factor}*P_x{n}*{arms}/l")
                continue
            s, e, first, last = _stretch(single)
            whole = f"{factor}*w_x{n}*({e} - {s})"
            if last <= x:
                terms.append(f"{whole}*({s} + {e})/2*(l - x_f)/l")
                continue
            terms.append(f"{whole}*(l - ({s} + {e})/2)*x_f/l")
            if first < x:
                terms.append(f"-{factor}*w_x{n}*(x_f - {s})**2/2")
        return terms

    def _hanging(self, x: float, load: str) -> list[str]:
        """Return what the loads beyond x_f, towards the free end of a cantilever, give there.

        There are some: without them no moment is there that could crack the section.
        """
        right = self.model.inputs.supports[self.span].kind == "free"
        terms = [f"-{load}*{'(l - x_f)' if right else 'x_f'}**2/2"] if load else []
        for single in self._single():
            n, factor = single.number, factor_text(self.on_span[single.kind])
            self.names |= single.entries
            if single.at is not None:
                if (single.at.value > x) == right:
                    arm = f"(a_x{n} - x_f)" if right else f"(x_f - a_x{n})"
                    terms.append(f"-{factor}*P_x{n}*{arm}")
                continue
            s, e, first, last = _stretch(single)
            if first < x < last:
                end = f"({e} - x_f)" if right else f"(x_f - {s})"
                terms.append(f"-{factor}*w_x{n}*{end}**2/2")
            elif (first >= x) == right:
                arm = f"(({s} + {e})/2 - x_f)" if right else f"(x_f - ({s} + {e})/2)"
                terms.append(f"-{factor}*w_x{n}*({e} - {s})*{arm}")
        return terms

    def _any(self, end: End) -> bool:
        return any(moment_name(self.model, g, self.span, end) for g in self.by_group)

    def _record_load(self, symbol: str) -> None:
        terms = []
        for kind, factor in self.on_span.items():
            if (kind, self.span) in self.model.uniform:
                name = f"w_{code(kind)}{self.span}"
                self.names[name] = self.model.uniform[kind, self.span]
                terms.append(_times(factor, name))
        if terms:
            self._line(f"{symbol} = {' + '.join(terms)}", "kN/m", f"Load on span {self.span}")

    def _single(self) -> list[SingleLoad]:
        return [load for load in self.model.on_span(self.span) if load.kind in self.on_span]

    def _at_middle(self, load: SingleLoad) -> str:
        """Return what a single load gives at midspan of the simple span."""
        n, factor = load.number, factor_text(self.on_span[load.kind])
        self.names |= load.entries
        half = self.model.lengths[self.span - 1].value / 2
        if load.at is not None:
            arm = f"a_x{n}" if load.at.value <= half else f"(l - a_x{n})"
            return f"{factor}*P_x{n}*{arm}/2"
        s, e, first, last = _stretch(load)
        w = f"{factor}*w_x{n}"
        if last <= half:
            return f"{w}*({e} - {s})*({s} + {e})/4"
        if first >= half:
            return f"{w}*({e} - {s})*(l - ({s} + {e})/2)/2"
        return f"{w}*(({e} - {s})*(l - ({s} + {e})/2)/2 - (l/2 - {s})**2/2)"


def _stretch(load: SingleLoad) -> tuple[str, str, float, float]:
    """Return the symbols of begin and end of a load over part of a span, and both in mm."""
    if load.start is None or load.end is None:
        msg = f"load {load.number} has no place"
        raise ValueError(msg)
    n = load.number
    return f"s_x{n}", f"e_x{n}", load.start.value, load.end.value


def _times(factor: float, name: str) -> str:
    return name if factor == 1 else f"{factor_text(factor)}*{name}"
