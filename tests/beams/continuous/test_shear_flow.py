"""Shear within the flow: with the forces of each section recorded line by line."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import pytest

from lineproof.beams.continuous.bearing import largest_reaction
from lineproof.beams.continuous.case_forces import record_forces
from lineproof.beams.continuous.layout import BuiltSupport
from lineproof.beams.continuous.model import outline_of
from lineproof.beams.continuous.shear_numbers import (
    Held,
    ShearBasis,
    SpanEnd,
    SpanNumbers,
    Stretch,
)
from lineproof.beams.continuous.shear_record import record_place, record_section
from lineproof.beams.continuous.stirrups_choice import choose_stirrups
from lineproof.beams.continuous.stirrups_record import record_stirrups
from lineproof.beams.steps import Steps

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .flow import MIXED, analysed, record_so_far, run


def end_of(support: BuiltSupport, *, exterior: bool) -> SpanEnd:
    held: Held = "indirect" if support.carrier == "girder" else "direct"
    return SpanEnd("free" if support.kind == "free" else held, exterior, 1000.0)


@pytest.mark.parametrize("changes", [{}, MIXED], ids=["three spans", "cantilever and columns"])
def test_shear_with_forces_line_by_line(changes: Mapping[str, Any]) -> None:
    """M_f and V_f by the statics of the case are those that the stirrups were chosen by."""
    beam = analysed(**changes)
    model, sheet = beam.model, beam.sheet
    sheet.expected = {}  # the parts of shear are made here, not by the chapter
    outline = outline_of(sheet, beam.inputs)
    names = ("b_w", "f_c", "f_y", "phi_c", "phi_s", "lambda_", "a_max", "c_c")
    basis = ShearBasis(*(sheet.find(name).value for name in names))
    spans = []
    last = len(outline.supports) - 1
    for k, (length, h) in enumerate(zip(outline.lengths, outline.depths, strict=True), start=1):
        ends = [end_of(outline.supports[n], exterior=n in (0, last)) for n in (k - 1, k)]
        bottom, top = Stretch(0.0, length, 2500.0, h - 54), Stretch(0.0, length, 3000.0, h - 60)
        spans.append(SpanNumbers(k, h, (bottom,), (top,), ends[0], ends[1]))
    choice = choose_stirrups(outline, model.forces, basis, spans)
    with sheet.part("stirrups", "Stirrups"):
        alike = record_stirrups(Steps(sheet, {}), choice, outline)
    for section in (each for row in choice.sections for each in row):
        k = section.span
        given = sheet.entries_of("given")
        with sheet.part(section.key, section.title):
            steps = Steps(sheet, alike)
            steps.bind(
                h=given["h"] if "h" in given else given[f"h_{k}"],
                b_sn=given[f"b_s{k + (section.end == 'right')}"],
                d=sheet.given("d", f"{section.d!r} mm"),
                A_s=sheet.given("A_s", f"{section.A_s!r} mm2"),
                A_sp=sheet.given("A_sp", f"{section.A_sp!r} mm2"),
            )
            if section.bearing is not None:
                steps.bind(A_sb=sheet.given("A_sb", "1000 mm2"))
            x_f = record_place(steps, section)
            record_forces(steps, model, section.demand, section.end, x=x_f)
            record_section(steps, basis, section)
            V_r = section.values["V_r"]
            assert steps.entry("V_r").value == pytest.approx(V_r, rel=1e-8)
    assert not list(faults(record_so_far(beam).data))


def test_assumed_restraint_adds_to_shear_and_reaction_and_shortens_the_flange() -> None:
    """M = w l^2/24 on a girder: M/l = w l/24; the flange takes it over 7600/12 - 200 = 433 mm.

    M_f = 115.007 kN.m; 4-20M at d = 568.95: a = 408 000/(0.802 x 0.65 x 32 x 380) = 64.36 mm, M_r =
    408 x (0.56895 - 0.03218) = 219.0 kN.m. One 20M in each overhang: 0.85 x 300 x 0.4 = 102 kN at
    yield, 102 x 115.007/219.0 = 53.56 kN with the moment.
    """
    beam = analysed(slab_bars="2 x 15M at 150 mm")
    run(beam, ("flexure", "shear"))
    sheet = beam.sheet
    hog, held = sheet.entries_of("hog-1-right"), sheet.entries_of("shear-1-left-restraint")
    more = hog["w_f"].value * 7600.0 / 24
    assert held["V_fr"].value == pytest.approx(sheet.entry("shear-1-left/V_f").value + more)
    assert held["shear-restraint"]
    R = largest_reaction(beam.model.forces, 1)[1]
    assert sheet.entry("support-1/R_f").value == pytest.approx(R + more)
    l_vf = sheet.entry("interface-hog-1-right/l_vf").value
    assert l_vf == pytest.approx(7600 / 12 - 200, abs=0.01)
    assert sheet.entry("interface-hog-1-right/F_o").value == pytest.approx(53.56e3, rel=1e-3)
    share = sheet.entry("hog-2-right/M_f").value / sheet.entry("hog-2-left/M_r").value
    F_o = sheet.entry("interface-hog-2-right/F_o").value
    assert F_o == pytest.approx(102e3 * share)  # the face that shares the section of the other
    assert "shear-1-right-restraint" not in {part.key for part in sheet.parts}


def test_shear_with_the_restraint_has_its_own_resistance_and_tension_in_the_top_bars() -> None:
    """The top is in tension by w l^2/24; 4-20M at the top, 10M at 350 mm, f'c 32, 620 x 380.

    w_f = 1.25 x 20.3736 + 1.5 x 14.88 = 47.787 kN/m, M_f = 47.787 x 7.6^2/24 = 115.007 kN.m; V_fr =
    140.67 + 115.007/7.6 = 155.80 kN. d_v = 0.9(620 - 30 - 11.3 - 9.75) = 512.06 mm. eps_x =
    (115 007/512.06 + 155.80) 1000/(2 x 200 000 x 1200) = 0.000 792 5; beta = 0.4/(1 + 1.18875) =
    0.18275; theta = 29 + 5.5475 = 34.548 deg, cot = 1.45237. V_c = 0.65 x 0.18275 x sqrt(32) x 380
    x 512.06 = 130.76 kN, V_s = 0.85 x 200 x 400 x 512.06 x 1.45237/350 = 144.5 kN: V_r = 275.2 kN.
    F_lt = 224.60 + (155.80 - 72.25) x 1.45237 = 345.95 kN, of 0.85 x 1200 x 400 = 408 kN.
    """
    beam = analysed()
    run(beam, ("flexure", "shear"))
    held = beam.sheet.entries_of("shear-1-left-restraint")
    assert held["V_fr"].value == pytest.approx(155.80e3, abs=10)
    assert held["eps_x"].value == pytest.approx(0.0007925, abs=5e-8)
    assert held["theta"].value == pytest.approx(34.548, abs=1e-3)
    V_fr, V_r = held["shear-restraint"].value
    assert (V_fr, V_r) == (pytest.approx(155.80e3, abs=10), pytest.approx(275.25e3, abs=50))
    F_lt, F_r = held["bars-tension-side"].value
    assert (F_lt, F_r) == (pytest.approx(345.95e3, abs=50), pytest.approx(408e3))
    assert not list(faults(record_so_far(beam).data))


def test_top_bars_of_a_girder_are_chosen_with_the_shear_of_the_restraint() -> None:
    """The choice asks 345.95 kN/(0.85 x 400 MPa) = 1017.5 mm2 of the top bars, as the page does."""
    beam = analysed()
    run(beam, ("flexure", "shear"))
    _, (needed, there) = beam.design.stirrups.checks[0].bar_areas()
    assert needed[:, 0].max() == pytest.approx(1017.5, abs=0.2)
    assert there[0, 0] == pytest.approx(1200)


def test_overhang_bars_developed_in_part_push_on_the_flange_in_part() -> None:
    """A fixed wall of 400 mm: the hook in the overhang stands 350 mm behind the face, untied.

    30M: l_hb = 100*29.9/sqrt(32) = 528.56 mm, without the factor of ties: 350/528.6 = 0.662 of the
    bar of 700 mm2 counts, in M_r as in F_o = 0.85*0.662*700*400*M_f/M_r = 157.6 kN*M_f/M_r.
    """
    beam = analysed(
        supports=["wall 400 mm, fixed", *["column 450 mm"] * 2, "wall 400 mm, fixed"],
        top_bars=["4-30M", "4-30M", "4-30M", "4-30M"], slab_bars="2 x 15M at 150 mm",
    )  # fmt: skip
    run(beam, ("flexure", "shear"))
    hog, held = (beam.sheet.entries_of(f"{key}hog-1-right") for key in ("", "interface-"))
    assert hog["n_o"].value == 1
    F_o = 157.6e3 * hog["M_f"].value / hog["M_r"].value
    assert held["F_o"].value == pytest.approx(F_o, rel=1e-3)
    assert not list(faults(record_so_far(beam).data))
