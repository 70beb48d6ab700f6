"""The beam as it is analysed: what stands on the sheet, as numbers and as the entries behind them.

The model is rebuilt from the sheet whenever it is needed, so that cells may be run in any order.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace
from functools import cached_property, lru_cache

from lineproof.beams.analysis.arrangements import service_combinations
from lineproof.beams.analysis.model import (
    Beam,
    Load,
    PartialLoad,
    PointLoad,
    Span,
    Support,
    UniformLoad,
)
from lineproof.beams.continuous.forces import End, Forces
from lineproof.beams.continuous.imported_forces import (
    ForcesFile,
    ImportedForces,
    imported_forces,
)
from lineproof.beams.continuous.inputs import ContinuousInputs
from lineproof.beams.continuous.layout import BeamOutline
from lineproof.beams.continuous.symbols import KINDS, code
from lineproof.beams.continuous.typed_beam import TypedLoad, outline_of_typed
from lineproof.record import Entry
from lineproof.sheet import Sheet

GIVEN, LOADS, COLUMNS, ANALYSIS = "given", "loads", "columns", "analysis"
SAME_EI = 1e9
"""Moment of inertia of every span where it is the same in all: it cancels."""


def span_key(span: int) -> str:
    """Return the key of the part of a span's geometry."""
    return f"span-{span}"


@dataclass(frozen=True, slots=True)
class SingleLoad:
    """A load that is not uniform over its span, with the entries of its size and place.

    ``at`` for a point load, ``start`` and ``end`` for a load over part of the span.
    """

    number: int
    kind: str
    span: int
    size: Entry
    at: Entry | None = None
    start: Entry | None = None
    end: Entry | None = None

    @property
    def name(self) -> str:
        """Return the symbol of its size."""
        return f"{'P' if self.at is not None else 'w'}_x{self.number}"

    @property
    def entries(self) -> dict[str, Entry]:
        """Return its entries by symbol."""
        n = self.number
        named = {self.name: self.size, f"a_x{n}": self.at, f"s_x{n}": self.start}
        return {k: e for k, e in (named | {f"e_x{n}": self.end}).items() if e is not None}

    @property
    def total(self) -> float:
        """The whole load [N]: a load over part of the span times its length."""
        size: float = self.size.value
        if self.start is not None and self.end is not None:
            size *= self.end.value - self.start.value
        return size

    @property
    def load(self) -> Load:
        """Return it as the analysis takes it."""
        if self.at is not None:
            return PointLoad(self.kind, self.span, self.size.value, self.at.value)
        if self.start is None or self.end is None:
            msg = f"load {self.number} has no place"
            raise ValueError(msg)
        return PartialLoad(self.kind, self.span, self.size.value, self.start.value, self.end.value)


@dataclass(frozen=True, eq=False)
class Model:
    """The beam of a sheet: inputs, entries of spans and loads, and its solved load cases."""

    sheet: Sheet
    inputs: ContinuousInputs
    lengths: tuple[Entry, ...]
    uniform: Mapping[tuple[str, int], Entry]
    single: tuple[SingleLoad, ...]
    inertias: tuple[Entry, ...]
    stiffnesses: Mapping[int, Entry]
    forces: Forces

    @property
    def spans(self) -> int:
        """Number of spans."""
        return len(self.lengths)

    @property
    def imported(self) -> ImportedForces | None:
        """The forces of an office's frame analysis, if they stand for our own."""
        return self.forces if isinstance(self.forces, ImportedForces) else None

    @cached_property
    def specified(self) -> Model | None:
        """The beam under specified loads, moments not redistributed; None of imported moments."""
        if self.imported is not None:
            return None
        return replace(self, forces=self.forces.under(service_combinations(self.kinds())))

    def on_span(self, span: int) -> tuple[SingleLoad, ...]:
        """Return the single loads of a span."""
        return tuple(load for load in self.single if load.span == span)

    def kinds(self) -> tuple[str, ...]:
        """Return the load types in the order of the analysis."""
        return tuple(dict.fromkeys(kind for kind, _ in self.forces.solution.rows))


def model_of(sheet: Sheet, inputs: ContinuousInputs) -> Model:
    """Return the model from what stands on the sheet; raises :class:`UserError`."""
    count = len(inputs.spans)
    given = sheet.entries_of(GIVEN)
    loads = sheet.entries_of(LOADS)
    lengths = tuple(given[f"l_{k}"] for k in range(1, count + 1))
    uniform = {
        (kind, k): loads[f"w_{code(kind)}{k}"]
        for kind in KINDS
        for k in range(1, count + 1)
        if f"w_{code(kind)}{k}" in loads
    }
    single = tuple(_single(inputs, loads))
    inertias: tuple[Entry, ...] = ()
    if needs_inertia(inputs):
        inertias = tuple(sheet.entry(f"{span_key(k)}/I_g") for k in range(1, count + 1))
    stiffnesses = {
        n: sheet.entry(f"{COLUMNS}/K_{n}")
        for n, support in enumerate(inputs.supports, start=1)
        if support.kind == "elastic"
    }
    spans = tuple(
        Span(length.value, inertias[i].value if inertias else SAME_EI)
        for i, length in enumerate(lengths)
    )
    supports = tuple(
        Support(
            support.kind,
            0.0 if support.width is None else support.width.value,
            stiffnesses[n].value if n in stiffnesses else 0.0,
        )
        for n, support in enumerate(inputs.supports, start=1)
    )
    acting = (
        *(UniformLoad(kind, k, entry.value) for (kind, k), entry in uniform.items()),
        *(load.load for load in single),
    )
    beam, file = Beam(spans, supports), inputs.forces_file
    if file is not None:
        forces: Forces = _imported(beam, file)
    else:
        forces = _forces(beam, acting, tuple(inputs.redistribution.items()))
    return Model(sheet, inputs, lengths, uniform, single, inertias, stiffnesses, forces)


def needs_inertia(inputs: ContinuousInputs) -> bool:
    """Tell whether the stiffness of the spans does not cancel out of the analysis."""
    if inputs.forces_file is not None:
        return False
    depths = {depth.value for depth in inputs.depths}
    return len(depths) > 1 or any(s.kind == "elastic" for s in inputs.supports)


def _single(inputs: ContinuousInputs, loads: Mapping[str, Entry]) -> list[SingleLoad]:
    made = []
    for number, (typed, span) in enumerate(single_loads(inputs), start=1):
        name = "P" if typed.form == "point" else "w"
        made.append(
            SingleLoad(
                number, typed.kind, span, loads[f"{name}_x{number}"],
                *(loads.get(f"{place}_x{number}") for place in ("a", "s", "e")),
            )
        )  # fmt: skip
    return made


def single_loads(inputs: ContinuousInputs) -> list[tuple[TypedLoad, int]]:
    """Return the loads given that are not uniform over a span, one a span they act on."""
    return [
        (load, span)
        for load in inputs.loads
        if load.form == "point" or load.start is not None
        for span in load.spans
    ]


def whole_span_loads(inputs: ContinuousInputs) -> list[TypedLoad]:
    """Return the loads given that act over whole spans."""
    return [load for load in inputs.loads if load.form != "point" and load.start is None]


@lru_cache(maxsize=32)
def _forces(
    beam: Beam, loads: tuple[Load, ...], reductions: tuple[tuple[int, float], ...]
) -> Forces:
    return Forces.of(beam, loads, reductions=dict(reductions))


@lru_cache(maxsize=8)
def _imported(beam: Beam, file: ForcesFile) -> Forces:
    return imported_forces(beam, file)


def outline_of(sheet: Sheet, inputs: ContinuousInputs) -> BeamOutline:
    """Return the concrete of the beam as it is built [mm]."""
    widths = tuple(
        sheet.entry(f"{span_key(k)}/b_f").value if inputs.slab else inputs.b_w.value
        for k in range(1, len(inputs.spans) + 1)
    )
    made = outline_of_typed(vars(inputs), widths)
    assert made is not None  # noqa: S101 - checked inputs are whole
    return made


def near_support(span: int, end: End) -> int:
    """Return the number of the support at an end of a span."""
    return span if end == "left" else span + 1
