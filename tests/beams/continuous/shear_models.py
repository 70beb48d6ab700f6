"""Beams for the tests of shear, their sheets, and the formulas of shear written out once more.

The second path below knows nothing of the catalogue: N, mm, MPa and numpy alone.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass

import numpy as np

from lineproof.beams.analysis.arrangements import Combination
from lineproof.beams.analysis.curves import Floats
from lineproof.beams.analysis.model import Beam, Load, PointLoad, Span, Support, UniformLoad
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.layout import BeamOutline, BuiltSupport
from lineproof.beams.continuous.shear_numbers import ShearBasis, SpanEnd, SpanNumbers, Stretch
from lineproof.beams.continuous.shear_record import record_place, record_section
from lineproof.beams.continuous.shear_sections import ShearSection
from lineproof.beams.continuous.stirrups_choice import Choice, check_stirrups
from lineproof.beams.continuous.stirrups_given import read_stirrups
from lineproof.beams.continuous.stirrups_record import record_stirrups
from lineproof.beams.steps import Steps
from lineproof.record import Entry, Record
from lineproof.sheet import Sheet
from lineproof.standards.catalogue import NOTATION

DEAD_ONLY = (Combination("1.0D", "", (("D", 1.0),)),)
BASIS = ShearBasis(380.0, 32.0, 400.0, 0.65, 0.85, 1.0, 20.0, 30.0)
CHECKED = ShearBasis(350.0, 35.0, 400.0, 0.65, 0.85, 1.0, 20.0, 40.0)
"""The base beam of the independent checks: 350 x 600, d = 535, 10M stirrups."""
DIRECT = SpanEnd()


@dataclass(frozen=True)
class Case:
    """A beam with what its shear needs."""

    forces: Forces
    outline: BeamOutline
    spans: tuple[SpanNumbers, ...]


def uniform(lengths: tuple[float, ...], dead: float, live: float) -> list[Load]:
    """Return the same uniform loads on every span [N/mm]."""
    numbers = range(1, len(lengths) + 1)
    return [UniformLoad(kind, k, w) for kind, w in (("D", dead), ("L", live)) for k in numbers if w]


def case_of(
    lengths: tuple[float, ...],
    loads: list[Load],
    *,
    width: float = 450.0,
    h: float = 620.0,
    bottom: tuple[float, float] = (2000.0, 566.0),
    top: tuple[float, float] = (2500.0, 560.0),
    ends: tuple[SpanEnd, SpanEnd] = (SpanEnd(exterior=True, A_bearing=1000.0),) * 2,
    inner: SpanEnd = DIRECT,
    combinations: tuple[Combination, ...] | None = None,
) -> Case:
    """Return a beam on simple supports of one width; bars run through, (area, depth) a face."""
    beam = Beam(
        tuple(Span(length, 1e14) for length in lengths),
        tuple(Support("simple", width) for _ in range(len(lengths) + 1)),
    )
    outline = BeamOutline(
        "rectangular", lengths, (h,) * len(lengths), (380.0,) * len(lengths),
        tuple(BuiltSupport(width, "simple", "column") for _ in range(len(lengths) + 1)),
        380.0, 0.0, 30.0,
    )  # fmt: skip
    held = [ends[0], *[inner] * (len(lengths) - 1), ends[1]]
    spans = tuple(
        SpanNumbers(
            k, h, (Stretch(0.0, length, *bottom),), (Stretch(0.0, length, *top),),
            held[k - 1], held[k],
        )
        for k, length in enumerate(lengths, start=1)
    )  # fmt: skip
    return Case(Forces.of(beam, loads, combinations), outline, spans)


def check_zones(case: Case, basis: ShearBasis, zones: object) -> Choice:
    """Check stirrups as they are typed, zone by zone."""
    clear = {numbers.span: case.forces.beam.clear(numbers.span) for numbers in case.spans}
    given = read_stirrups("stirrups", zones, clear, basis.stirrup)
    return check_stirrups(case.outline, case.forces, basis, case.spans, given)


def three_spans(dead: float = 30.0, live: float = 25.0) -> Case:
    """Return the floor beam of 7.6, 9.2, 7.6 m."""
    lengths = (7600.0, 9200.0, 7600.0)
    return case_of(lengths, uniform(lengths, dead, live))


def point(span: int, P: float, at: float, kind: str = "D") -> PointLoad:
    """Return a point load in N at mm from the left axis."""
    return PointLoad(kind, span, P, at)


def new_sheet(basis: ShearBasis) -> Sheet:
    """Return a sheet with the values that are alike over the beam."""
    sheet = Sheet("B1", notation=NOTATION)
    units = {
        "b_w": "mm", "f_c": "MPa", "f_y": "MPa", "phi_c": "", "phi_s": "", "lambda_": "",
        "a_max": "mm", "E_s": "MPa",
    }  # fmt: skip
    with sheet.part("given", "Given"):
        for name, unit in units.items():
            sheet.given(name, f"{getattr(basis, name):.12g} {unit}".strip())
        sheet.given("c_c", f"{basis.cover:g} mm")
    return sheet


def nothing(section: ShearSection) -> Mapping[str, Entry]:
    """Return no further entries."""
    del section
    return {}


def record(
    sheet: Sheet,
    case: Case,
    choice: Choice,
    more: Callable[[ShearSection], Mapping[str, Entry]] = nothing,
) -> Record:
    """Record the stirrups and every section, comparing each value with the number of the choice."""
    with sheet.part("stirrups", "Stirrups"):
        alike = record_stirrups(Steps(sheet, {}), choice, case.outline)
    for section in (each for row in choice.sections for each in row):
        with sheet.part(section.key, section.title):
            steps = Steps(sheet, alike | place_of(sheet, case, section) | dict(more(section)))
            x_f = record_place(steps, section)
            assert abs(x_f.value - section.distance) <= 1e-9 * section.distance
            given = sheet.given
            steps.bind(
                M_f=given("M_f", f"{section.values['M_f'] / 1e6!r} kN.m"),
                V_f=given("V_f", f"{section.values['V_f'] / 1e3!r} kN"),
            )
            record_section(steps, choice.basis, section)
            compare(steps, section)
    return sheet.close()


def place_of(sheet: Sheet, case: Case, section: ShearSection) -> dict[str, Entry]:
    """Record what a section needs as given."""
    numbers = case.spans[section.span - 1]
    support = case.outline.supports[section.span - (section.end == "left")]
    rows = {
        "h": numbers.h, "d": section.d, "A_s": section.A_s, "A_sp": section.A_sp,
        "b_sn": support.width,
    }  # fmt: skip
    if section.cap is not None:
        rows["A_sr"] = section.cap
    if section.bearing is not None:
        rows["A_sb"] = section.bearing.A_bearing
    units = {name: "mm2" if name.startswith("A") else "mm" for name in rows}
    return {n: sheet.given(n, f"{v:.12g} {units[n]}", unit=units[n]) for n, v in rows.items()}


def compare(steps: Steps, section: ShearSection) -> None:
    """Hold the recorded values against the numbers that the stirrups were chosen by."""
    for name, number in section.values.items():
        if name in steps.place:
            found = steps.place[name].value
            assert abs(found - number) <= 1e-9 * abs(number) + 1e-12, (section.key, name)


def number(record: Record, entry_id: str) -> float:
    """Return a printed number of the record."""
    for part in record.data["parts"]:
        for entry in part["entries"]:
            if entry["id"] == entry_id:
                return float(entry["printed"]["result"])
    raise AssertionError(entry_id)


# -- the second path ------------------------------------------------------------------------------


@dataclass(frozen=True)
class Second:
    """Shear of many pairs by the formulas written out here; arrays of one shape."""

    d_v: Floats
    eps_x: Floats
    V_c: Floats
    cot: Floats
    V_most: Floats
    s_max: Floats

    def resistance(self, basis: ShearBasis, spacing: Floats | float) -> Floats:
        """Return V_r for stirrups at a spacing."""
        V_s = 0.85 * basis.legs * 100 * basis.f_y * self.d_v * self.cot / spacing
        made: Floats = np.minimum(self.V_c + V_s, self.V_most)
        return made


def second(basis: ShearBasis, h: float, d: Floats, A_s: Floats, M: Floats, V: Floats) -> Second:
    """Work out pairs of moment and shear for 10M stirrups, at least the minimum."""
    d_v = np.maximum(0.9 * d, 0.72 * h)
    M_f, V_f = np.abs(M), np.abs(V)
    eps = (np.maximum(M_f, V_f * d_v) / d_v + V_f) / (2 * 200_000 * A_s)
    beta, angle = 0.4 / (1 + 1500 * eps), 29 + 7000 * eps
    if basis.method == "simplified":
        eps, beta, angle = 0 * eps, 0 * eps + 0.18, 0 * eps + 35.0
    root = min(np.sqrt(basis.f_c), 8.0)
    V_c = 0.65 * basis.lambda_ * beta * root * basis.b_w * d_v
    high = V_f > 0.125 * basis.lambda_ * 0.65 * basis.f_c * basis.b_w * d_v
    s_max = np.minimum(0.7 * d_v, 600) * np.where(high, 0.5, 1.0)
    most = 0.25 * 0.65 * basis.f_c * basis.b_w * d_v
    return Second(d_v, eps, V_c, 1 / np.tan(np.radians(angle)), most, s_max)
