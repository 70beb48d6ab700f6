"""Moments at the supports by load type, closed by slopes that agree.

Only these moments are found by a procedure. A reader closes each by hand: the spans on both sides
of a support have the same slope there; for a simple support and one inertia that is the equation
of three moments.
"""

from __future__ import annotations

from collections.abc import Iterator

from lineproof.beams.continuous.forces import End
from lineproof.beams.continuous.groups import (
    Group,
    ends_at,
    is_loaded,
    moment_name,
    named,
    single_of,
    uniform_name,
    where,
)
from lineproof.beams.continuous.model import Model, SingleLoad
from lineproof.beams.continuous.stiffness import SUPPORT_CODES, support_moment
from lineproof.beams.continuous.symbols import required, stated
from lineproof.formula import Criterion
from lineproof.record import Entry
from lineproof.sheet.finding import Wanted
from lineproof.standards.references import MECHANICS


class SupportMoments:
    """The support moments of one group, with what closes them."""

    def __init__(self, model: Model, group: Group) -> None:
        self.model, self.group, self.sheet = model, group, model.sheet
        self.beam = model.forces.beam
        self.scope: dict[str, Entry] = {
            f"l_{k}": entry for k, entry in enumerate(model.lengths, start=1)
        }
        self.scope |= {f"I_{k}": entry for k, entry in enumerate(model.inertias, start=1)}
        self.scope |= {f"K_{j}": entry for j, entry in model.stiffnesses.items()}
        self.settings = {
            f"support_{j}": SUPPORT_CODES[s.kind]
            for j, s in enumerate(model.inputs.supports, start=1)
        }
        self.args = dict(self.scope)

    def record(self) -> None:
        """Record the group's loads, the moments of cantilevers, then those found."""
        for span in range(1, self.model.spans + 1):
            self._take_loads(span)
        for support in range(1, self.model.spans + 2):
            self._record_cantilevers(support)
        wanted = [w for j in range(1, self.model.spans + 2) for w in self._wanted(j)]
        found = self.sheet.found_set(support_moment, wanted)
        self.scope |= found

    def _take_loads(self, span: int) -> None:
        name = uniform_name(self.model, self.group, span)
        own: dict[str, Entry] = {}
        if name:
            own[name] = self.model.uniform[self.group.kind, span]
        single = single_of(self.model, self.group, span)
        for load in single:
            own |= load.entries
            self.settings[f"x{load.number}"] = float(span)
        self.scope |= own
        self.args |= own
        if single and not self.beam.cantilever(span):
            self._record_slopes(span, name, single)

    def _record_slopes(self, span: int, uniform: str, single: list[SingleLoad]) -> None:
        """Record EI times the end slopes of the simple span under loads that are not uniform."""
        for letter, end in (("a", "left"), ("b", "right")):
            terms = [f"{uniform}*l_{span}**3/24"] if uniform else []
            terms += [_slope_of(load, span, end) for load in single]
            symbol = f"F_{span}{letter}{self.group.code}"
            title = f"Slope at the {end} end of span {span}, simply supported, times EI"
            text = f"{symbol} = {' + '.join(terms)}"
            self.scope[symbol] = self.sheet.line(
                stated(text, title=title), **named(self.scope, text)
            )

    def _record_cantilevers(self, support: int) -> None:
        for span, end in ends_at(self.model, support):
            name = moment_name(self.model, self.group, span, end)
            if not (name and self.beam.cantilever(span)):
                continue
            terms = [f"{uniform_name(self.model, self.group, span)}*l_{span}**2/2"]
            if not uniform_name(self.model, self.group, span):
                terms = []
            for load in single_of(self.model, self.group, span):
                terms.append(_root_moment(load, span, end))
            text = f"{name} = -({' + '.join(terms)})"
            self.scope[name] = self.sheet.line(
                stated(text, title=f"Moment at the root of the cantilever, {where(self.group)}"),
                **named(self.scope, text),
            )

    def _wanted(self, support: int) -> Iterator[Wanted]:
        """Give the moments to be found at a support, each with what closes it."""
        kind = self.model.inputs.supports[support - 1].kind
        ends = [
            (span, end)
            for span, end in ends_at(self.model, support)
            if not self.beam.cantilever(span)
        ]
        if kind == "free" or not ends:
            return
        if kind == "simple":
            if len(ends) == 1:
                return
            (left, right) = ends
            name = moment_name(self.model, self.group, *left)
            yield self._one(name, left, support, f"{self._tilt(*left)} + {self._tilt(*right)}")
            return
        for span, end in ends:
            name = moment_name(self.model, self.group, span, end)
            if kind == "fixed":
                yield self._one(name, (span, end), support, self._tilt(span, end))
        if kind == "elastic":
            yield from self._held_by_columns(support, ends)

    def _held_by_columns(self, support: int, ends: list[tuple[int, End]]) -> Iterator[Wanted]:
        """Give the moments beside a support held by columns: one slope, and balance of the joint.

        The columns turn with the beam and take what the moments on both sides do not balance.
        """
        first = ends[0]
        tilt = self._tilt(*first)
        all_ends = list(ends_at(self.model, support))
        names = {end: self._moment(span, end) for span, end in all_ends}
        left, right = names.get("right", ""), names.get("left", "")
        if first[1] == "left":
            balance = _sum_of(right, left) + f" + K_{support}*({tilt})"
        else:
            balance = _sum_of(left, right) + f" + K_{support}*({tilt})"
        name = moment_name(self.model, self.group, *first)
        yield self._one(name, first, support, balance, joint=True)
        if len(ends) > 1:
            second = ends[1]
            other = moment_name(self.model, self.group, *second)
            yield self._one(other, second, support, f"{tilt} + {self._tilt(*second)}")

    def _moment(self, span: int, end: End) -> str:
        name = moment_name(self.model, self.group, span, end)
        known = name in self.scope or not self.beam.cantilever(span)
        return name if known else ""

    def _tilt(self, span: int, end: End) -> str:
        """Return the slope of a span at its end, towards the span, times EI or times E."""
        own, far = self._moment(span, end), self._moment(span, "right" if end == "left" else "left")
        parts = [f"2*{own}"] if own else []
        parts += [far] if far else []
        terms = [f"l_{span}*({' + '.join(parts)})/6"] if parts else []
        load = self._load_term(span, end)
        terms += [load] if load else []
        text = " + ".join(terms) or f"0*l_{span}*l_{span}"
        return f"({text})/I_{span}" if self.model.inertias else text

    def _load_term(self, span: int, end: End) -> str:
        letter = "a" if end == "left" else "b"
        if single_of(self.model, self.group, span):
            return f"F_{span}{letter}{self.group.code}"
        name = uniform_name(self.model, self.group, span)
        return f"{name}*l_{span}**3/24" if name else ""

    def _scale(self, support: int) -> str:
        """Return what a remainder is compared with: the slope of a loaded span by its load."""
        beside = [s for s in (support - 1, support) if 1 <= s <= self.model.spans]
        rest = [s for s in range(1, self.model.spans + 1) if s not in beside]
        for span in (*beside, *rest):
            if self.beam.cantilever(span):
                continue
            term = self._load_term(span, "left")
            if term:
                return f"{term}/I_{span}" if self.model.inertias else term
        return self._cantilever_scale()

    def _cantilever_scale(self) -> str:
        for span in range(1, self.model.spans + 1):
            if self.beam.cantilever(span) and is_loaded(self.model, self.group, span):
                end: End = "left" if self.model.inputs.supports[span].kind == "free" else "right"
                name = moment_name(self.model, self.group, span, end)
                inner = span - 1 if end == "left" else span + 1
                text = f"l_{inner}*abs({name})/6"
                return f"{text}/I_{inner}" if self.model.inertias else text
        msg = f"load group {self.group.code} loads nothing"
        raise ValueError(msg)

    def _one(
        self, name: str, at: tuple[int, End], support: int, text: str, *, joint: bool = False
    ) -> Wanted:
        scale = self._scale(support)
        unit = "kPa" if self.model.inertias else "kN.m2"
        times = "E" if self.model.inertias else "EI"
        if joint:
            closing = required(
                f"abs({text}) <= 0.001*K_{support}*({scale})", "kN.m",
                title=f"Balance of the joint at support {support}",
                yes="Beam and columns balance.", key=f"joint-{name}",
            )  # fmt: skip
        else:
            closing = required(
                f"abs({text}) <= 0.001*({scale})", unit,
                title=f"Slopes at support {support}", yes=_agree(text, times), key=f"slopes-{name}",
            )  # fmt: skip
        span, end = at
        return self._value(name, closing, span, end, support)

    def _value(self, name: str, closing: Criterion, span: int, end: End, support: int) -> Wanted:
        place = {"span": float(span), "end": 0.0 if end == "left" else 1.0}
        return Wanted(
            name, closing, "kN.m", self.args, self.settings | place,
            f"Moment at support {support}, {where(self.group)}", "statics", MECHANICS,
            bound=self.scope,
        )  # fmt: skip


def _agree(text: str, times: str) -> str:
    """Say what a closing shows; its sides are slopes times ``times``, in the unit of that."""
    if text.count("l_"):
        return f"The slopes of both spans agree (sides: slopes times {times})."
    return f"The slope is zero (sides: slopes times {times})."


def _sum_of(first: str, second: str) -> str:
    """Return first - second, where either may be zero."""
    if first and second:
        return f"{first} - {second}"
    return first or f"-{second}"


def _slope_of(load: SingleLoad, span: int, end: str) -> str:
    """Return EI times the end slope of a simple span under a single load."""
    n, l = load.number, f"l_{span}"
    if load.at is not None:
        far = f"(2*{l} - a_x{n})" if end == "left" else f"({l} + a_x{n})"
        return f"P_x{n}*a_x{n}*({l} - a_x{n})*{far}/(6*{l})"
    s, e = f"s_x{n}", f"e_x{n}"
    if end == "left":
        return f"w_x{n}*(({l}*{e} - {e}**2/2)**2 - ({l}*{s} - {s}**2/2)**2)/(6*{l})"
    return f"w_x{n}*({e}**2*(2*{l}**2 - {e}**2) - {s}**2*(2*{l}**2 - {s}**2))/(24*{l})"


def _root_moment(load: SingleLoad, span: int, end: End) -> str:
    """Return the size of the moment of a single load at the root of a cantilever."""
    n = load.number
    if load.at is not None:
        arm = f"a_x{n}" if end == "left" else f"(l_{span} - a_x{n})"
        return f"P_x{n}*{arm}"
    middle = f"(s_x{n} + e_x{n})/2"
    arm = middle if end == "left" else f"(l_{span} - {middle})"
    return f"w_x{n}*(e_x{n} - s_x{n})*{arm}"
