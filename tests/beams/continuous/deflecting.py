"""Beams for the tests of deflections: the same span in numbers and on a sheet."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from decimal import Decimal
from typing import Any

from lineproof.beams.analysis.model import Beam, Load, PartialLoad, PointLoad, Span, Support
from lineproof.beams.continuous import deflection as numbers
from lineproof.beams.continuous import deflection_record as record
from lineproof.beams.continuous.deflection_local import LocalLoad
from lineproof.beams.continuous.deflection_service import ServiceMoments, Stage
from lineproof.beams.steps import Steps
from lineproof.record import Entry
from lineproof.sheet import Sheet
from lineproof.standards.a23_3 import flange, materials
from lineproof.standards.catalogue import NOTATION

PROJECT = {"codes": {"pair": "NBC 2015 + A23.3-14"}}
F_C, B_W, H, H_F, B_F = 32.0, 380.0, 620.0, 140.0, 1900.0
E_C = 4500 * F_C**0.5
F_R = 0.6 * F_C**0.5
# Gross concrete that does not crack, rectangular: one EI all along.
STIFF = {"f_r": 1e6, "b_w": 400.0, "h_f": 0.0, "h": 600.0, "I_g": 7.2e9, "y_b": 300.0}
FLOOR = "floor, nothing attached that deflection damages"
PARTITIONS = numbers.DAMAGED
SYMBOLS = {"": ("M_m", "M_h1", "M_h2"), "left": ("M_h", "M_mb", "M_hb")}
SYMBOLS["right"] = SYMBOLS["left"]
EARLIER = ("M_aem", "M_ae1", "M_ae2")


def gross() -> tuple[float, float]:
    """Return I_g and y_b of the T section of these tests."""
    A_g = flange.AREA_TEE.function(B_W, H, B_F, H_F)
    y_b = flange.CENTROID_TEE.function(B_W, H, B_F, H_F, A_g)
    values = {"b_w": B_W, "h": H, "y_b": y_b, "b_f": B_F, "h_f": H_F}
    return flange.INERTIA_TEE.function(*[values[n] for n in flange.INERTIA_TEE.names]), y_b


def beam_of(lengths: Sequence[float], supports: Sequence[str]) -> Beam:
    """Return a beam of one EI, supports 400 mm wide where not free."""
    I_g, _ = gross()
    widths = [0.0 if kind == "free" else 400.0 for kind in supports]
    made = [Support(k, w) for k, w in zip(supports, widths, strict=True)]  # type: ignore[arg-type]
    return Beam(tuple(Span.of(length, E_C, I_g) for length in lengths), tuple(made))


def section_of(beam: Beam, span: int, **changes: Any) -> numbers.SpanSection:
    """Return the section of a span: bars by kind of place, simple outer ends without top bars."""
    I_g, y_b = gross()
    left, right = beam.supports[span - 1 : span + 1]
    top = numbers.Place(B_W, 560.0, 3000.0)
    free = "left" if left.kind == "free" else "right" if right.kind == "free" else ""
    outer_left = span == 1 and left.kind == "simple"
    outer_right = span == len(beam.spans) and right.kind == "simple"
    values: dict[str, Any] = {
        "l": beam.spans[span - 1].length, "l_n": beam.clear(span), "h": H, "b_w": B_W, "h_f": H_F,
        "I_g": I_g, "y_b": y_b, "f_r": F_R, "E_c": E_C, "E_s": 200000.0,
        "midspan": None if free else numbers.Place(B_F, 555.0, 2500.0),
        "left": None if outer_left or free == "left" else top,
        "right": None if outer_right or free == "right" else top,
        "free": free,
    }  # fmt: skip
    return numbers.SpanSection(**(values | changes))


def start_sheet(f_r: float = F_R) -> Sheet:
    """Return a sheet with the materials and sizes that all spans share; f_r for what cracks."""
    sheet = Sheet("B1", "Deflections", project=PROJECT, notation=NOTATION)
    sheet.codes = {"pair": "NBC 2015 + A23.3-14"}
    with sheet.part("given", "Given"):
        for symbol, text in (
            ("f_c", "32 MPa"), ("b_w", "380 mm"), ("h_f", "140 mm"), ("E_s", "200000 MPa"),
            ("f_y", "400 MPa"), ("gamma_c", "2400 kg/m3"), ("lambda_", "1"),
        ):  # fmt: skip
            sheet.given(symbol, text)
        sheet.line(materials.E_C_NORMAL)
        if f_r == F_R:
            sheet.line(materials.F_R)
        else:
            sheet.given("f_r", f"{f_r} MPa")
    return sheet


def given_span(
    sheet: Sheet,
    section: numbers.SpanSection,
    number: int,
    loads: Sequence[Load] = (),
    service: ServiceMoments | None = None,
) -> record.SpanEntries:
    """Record what a span is and return its entries, with local loads as they act in ``service``."""
    with sheet.part(f"span-{number}", f"Span {number}"):
        sheet.given("l", f"{section.l} mm")
        sheet.given("l_n", f"{section.l_n} mm", unit="m")
        sheet.given("h", f"{section.h} mm")
        sheet.given("b_f", f"{B_F} mm")
        for formula in (flange.AREA_TEE, flange.CENTROID_TEE, flange.INERTIA_TEE):
            sheet.line(formula)
        local = [_local(sheet, load, i) for i, load in enumerate(local_of(loads, number))]
    own = sheet.entries_of(f"span-{number}")
    if service is not None:
        local = acting(local, local_of(loads, number), service)
    places = {
        name: _place(sheet, number, name, place)
        for name in ("midspan", "left", "right", "top")
        if (place := getattr(section, name)) is not None
    }
    return record.SpanEntries(
        number,
        {name: own[name] for name in ("l", "l_n", "h", "I_g", "y_b")},
        places.get("midspan"), places.get("left"), places.get("right"),
        free=section.free, local=local, top=places.get("top"),
    )  # fmt: skip


def acting(
    local: Sequence[LocalLoad], loads: Sequence[PointLoad | PartialLoad], service: ServiceMoments
) -> list[LocalLoad]:
    """Return local loads with the factors that they have in the stages of a span."""
    pairs = zip(local, loads, strict=True)
    return [replace(at, factors=service.factors_on(load.kind, load.span)) for at, load in pairs]


def local_of(loads: Sequence[Load], span: int) -> list[PointLoad | PartialLoad]:
    return [x for x in loads if isinstance(x, PointLoad | PartialLoad) and x.span == span]


def _local(sheet: Sheet, load: PointLoad | PartialLoad, i: int) -> LocalLoad:
    share = sheet.given(f"r_Ls{i}", "0.5") if load.kind == "L" else None
    if isinstance(load, PointLoad):
        bound = {
            "P_s": sheet.given(f"P_{i}", f"{load.P} N", unit="kN"),
            "x_P": sheet.given(f"x_{i}", f"{load.at} mm", unit="m"),
        }
    else:
        bound = {
            "w_p": sheet.given(f"w_{i}", f"{load.w} N/mm", unit="kN/m"),
            "x_1": sheet.given(f"s_{i}", f"{load.start} mm", unit="m"),
            "x_2": sheet.given(f"e_{i}", f"{load.end} mm", unit="m"),
        }
    return LocalLoad(bound, {}, share)


def _place(sheet: Sheet, number: int, name: str, place: numbers.Place) -> dict[str, Entry]:
    with sheet.part(f"bars-{number}-{name}", f"Bars {name}"):
        made = {
            "d": sheet.given("d", f"{place.d} mm"),
            "A_s": sheet.given("A_s", f"{place.A_s} mm2"),
        }
        if place.A_sp:
            made["A_sp"] = sheet.given("A_sp", f"{place.A_sp} mm2")
            made["d_p"] = sheet.given("d_p", f"{place.d_p} mm")
    if name == "midspan":
        made["b"] = sheet.entry(f"span-{number}/b_f")
    return made


def record_span(
    sheet: Sheet, entries: record.SpanEntries, service: ServiceMoments, **choices: Any
) -> None:
    """Record the deflections of a span with the moments given."""
    if entries.free:
        symbols: tuple[str, ...] = SYMBOLS[entries.free] if entries.behind else ("M_h",)
    else:
        symbols = ("M_m", *(f"M_h{end}" for end in entries.ends))
    moments = given_moments(service, symbols)
    record.record_deflection(
        sheet,
        entries,
        moments,
        arrangement=service.arrangement,
        lifting=service.lifting,
        **choices,
    )


def given_moments(service: ServiceMoments, symbols: tuple[str, ...]) -> record.Moments:
    """Return moments of the stages as given values; ``symbols`` names those that the span has."""

    def give(steps: Steps, stage: Stage) -> None:
        moments = service.stages[stage]
        # The root of a cantilever stands where a span has its left support.
        values = {s: getattr(moments, "M_h1" if s == "M_h" else s) for s in symbols}
        values |= {s: v for s, v in zip(EARLIER, moments.earlier, strict=True) if v}
        for symbol, value in values.items():
            text = f"{Decimal(repr(value)).scaleb(-6):f} kN.m"
            made = steps.sheet.given(symbol, text, unit="kN.m", source="analysis of the test")
            steps.bind(**{symbol: made})

    return give
