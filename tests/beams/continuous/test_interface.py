"""Shear where flange and web meet: independent check 13, and the length by statics."""

from __future__ import annotations

import pytest

from lineproof.beams.analysis.model import Beam, PointLoad, Span, Support
from lineproof.beams.continuous.cures_sought import cures_of
from lineproof.beams.continuous.forces import Forces
from lineproof.beams.continuous.interface import (
    Beside,
    SlabBars,
    beside_hog,
    beside_sag,
    read_slab_bars,
    record_interface,
    record_interface_top,
    record_length,
    record_restrained_length,
)
from lineproof.beams.steps import Steps
from lineproof.errors import UserError
from lineproof.sheet import Sheet

from ..pocket import faults  # noqa: TID252 - one calculator for all tests of beams
from .shear_models import CHECKED, DEAD_ONLY, case_of, new_sheet, number, uniform


def place(sheet: Sheet, **typed: str) -> Steps:
    steps = Steps(sheet, {})
    for name, text in typed.items():
        steps.bind(**{name: sheet.given(name, text)})
    return steps


def test_independent_check_13() -> None:
    """2 x 10M at 250 in 130 mm: rho_v 0.00615, sigma 2.46, 2.89 MPa; 284.65 kN: 1.152 MPa."""
    sheet, slab = new_sheet(CHECKED), read_slab_bars("slab_bars", "2 x 10M at 250 mm")
    with sheet.part("interface-1", "Flange and web of span 1"):
        steps = place(sheet, A_s="2000 mm2", b="2150 mm", b_o="900 mm", h_f="130 mm", l_vf="1.9 m")
        record_interface(steps, slab, block_in_web=False)
    made = sheet.close()
    assert number(made, "interface-1/rho_v") == pytest.approx(0.00615, abs=5e-6)
    assert number(made, "interface-1/sigma") == pytest.approx(2.46, abs=5e-3)
    assert number(made, "interface-1/v_r") == pytest.approx(2.89, abs=5e-3)
    assert number(made, "interface-1/F_o") == pytest.approx(284.65, abs=0.5)
    assert sheet.entry("interface-1/v_f").value == pytest.approx(1.1524, abs=5e-5)
    assert not list(faults(made.data))


def test_block_in_the_web_and_bars_in_the_overhang() -> None:
    """1088.6 x 300/600 = 544.3 kN; 3-15M in the overhang: 0.85 x 3 x 200 x 0.4 = 204 kN.

    Under 96 kN.m of a resistance of 160: 204 x 0.6 = 122.4 kN.
    """
    sheet, slab = new_sheet(CHECKED), SlabBars(1, "10M", 250.0)
    with sheet.part("interface-1", "Sagging"):
        steps = place(
            sheet, C_f="1088.6 kN", b="900 mm", b_o="300 mm", b_w="300 mm", h_f="100 mm", l_vf="2 m"
        )
        record_interface(steps, slab, block_in_web=True)
    with sheet.part("interface-top-3", "Hogging"):
        steps = place(sheet, n_o="3", h_f="100 mm", l_vf="1.5 m", M_f="96 kN.m", M_r="160 kN.m")
        steps.bind(A_b=sheet.given("A_bt", "200 mm2"))
        record_interface_top(steps, slab, in_part=False)
    made = sheet.close()
    assert number(made, "interface-1/F_o") == pytest.approx(544.3, abs=1)
    assert number(made, "interface-top-3/F_o") == pytest.approx(122.4, abs=0.5)


def test_closer_slab_bars_are_told_as_a_cure() -> None:
    """204 kN over 1 m of 100 mm: 2.04 MPa.

    0.65 (1 + 1.4 x 400 x 100/(100 s)) reaches it at s = 560/(2.04/0.65 - 1) = 262 mm: 250 mm.
    """
    sheet = new_sheet(CHECKED)
    with sheet.part("interface-top", "Hogging"):
        steps = place(sheet, n_o="3", h_f="100 mm", l_vf="1 m", M_f="90 kN.m", M_r="90 kN.m")
        steps.bind(A_b=sheet.given("A_bt", "200 mm2"))
        record_interface_top(steps, SlabBars(1, "10M", 400.0), in_part=False)
    check = sheet.entry("interface-top/interface-shear")
    assert not check
    assert cures_of(check)[0].text == "these slab bars across the web at 250 mm or less"


def test_length_beside_the_largest_moment() -> None:
    """One simple span of 6 m between faces: half of it; two spans, dead alone: 3/8 l to the end.

    Two spans: M is largest at 3/8 l = 2.25 m and zero at 3/4 l = 4.5 m, so the length is 2.25 m
    less the half width of the support at the end, 2.25 m at the other side. Over the middle support
    M is zero 1.5 m from its axis, 1.3 m from the face.
    """
    one = case_of((6000.0,), uniform((6000.0,), 10, 0), width=0.0, combinations=DEAD_ONLY)
    found = beside_sag(one.forces, 1)
    assert found.at == pytest.approx(3000.0)
    assert found.zero == 0.0
    assert found.where == "face of the support"
    lengths = (6000.0, 6000.0)
    two = case_of(lengths, uniform(lengths, 10, 0), width=400.0, combinations=DEAD_ONLY)
    for span, at, zero in ((1, 2250.0, 200.0), (2, 3750.0, 5800.0)):
        found = beside_sag(two.forces, span)
        assert found.at == pytest.approx(at)
        assert found.zero == pytest.approx(zero)
    hog = beside_hog(two.forces, 2, "right")
    assert hog.at == pytest.approx(200.0)
    assert hog.zero == pytest.approx(1500.0)
    assert hog.where == "found along the span"


@pytest.mark.parametrize("tip", [2800.0, 9.186351706 * 304.8, 2743.2, 1933.3])
def test_moment_is_zero_at_a_free_end(tip: float) -> None:
    """A cantilever from a face 150 mm off its axis: from there to the tip, l - 150 mm.

    Whether the last bits of the sum change their sign at the tip does not count: 0.25 l_n had
    stood there by chance, a fourth of the length. A load of 0.6 kN is no point load.
    """
    for spans, kinds, root, side in (
        ((6000.0, tip), ("simple", "simple", "free"), 2, "right"),
        ((tip, 6000.0), ("free", "simple", "simple"), 2, "left"),
    ):
        beam = Beam(
            tuple(Span(length, 1e14) for length in spans),
            tuple(Support(kind, 0.0 if kind == "free" else 300.0) for kind in kinds),  # type: ignore[arg-type]
        )
        out = 1 + spans.index(tip)
        loads = [*uniform(spans, 17.3, 7.9), PointLoad("D", out, 480, 0.37 * tip)]
        hog = beside_hog(Forces.of(beam, loads), root, side)  # type: ignore[arg-type]
        assert hog.where == "free end"
        assert hog.zero is not None
        sheet = new_sheet(CHECKED)
        with sheet.part("between", "Between places"):
            record_length(place(sheet), hog)
        # Both places are rounded to whole mm.
        assert sheet.entry("between/l_vf").value == pytest.approx(tip - 150, abs=1.0)


def test_between_point_loads_the_force_enters_where_the_moment_falls_fastest() -> None:
    """A simple span of 6 m, 1.4 x 10 kN/m and 1.4 x 40 kN at 1.5 and 4.5 m.

    R = 14 x 3 + 56 = 98 kN; M = 98 x 3 - 14 x 3^2/2 - 56 x 1.5 = 147 kN.m at midspan and 98 x 1.5 -
    14 x 1.5^2/2 = 131.25 at the load, so 131.25 of 147 in 1.5 m: all of it in 1.68 m, not in 3 m.
    """
    loads = [*uniform((6000.0,), 10, 0), *(PointLoad("D", 1, 40e3, x) for x in (1500.0, 4500.0))]
    case = case_of((6000.0,), loads, width=0.0, combinations=DEAD_ONLY)
    found = beside_sag(case.forces, 1)
    assert found.at == pytest.approx(3000)
    assert found.zero is not None
    assert abs(found.zero - found.at) == pytest.approx(1680)


def test_a_point_load_on_a_cantilever() -> None:
    """2.8 m from the axis, face at 150 mm: w = 1.25 x 17.3 + 1.5 x 7.9 = 33.475 kN/m, P = 60 kN.

    P stands at 1.036 m. At the face M = 33.475 x 2.65^2/2 + 60 x 0.886 = 170.70 kN.m, at P 33.475 x
    1.764^2/2 = 52.08: it falls by 118.62 in 0.886 m, by all of it in 1.275 m, not in 2.65 m.
    """
    beam = Beam(
        (Span(6000.0, 1e14), Span(2800.0, 1e14)),
        (Support("simple", 300.0), Support("simple", 300.0), Support("free", 0.0)),
    )
    loads = [*uniform((6000.0, 2800.0), 17.3, 7.9), PointLoad("D", 2, 48e3, 1036.0)]
    hog = beside_hog(Forces.of(beam, loads), 2, "right")
    assert hog.zero == pytest.approx(150 + 1275.0, abs=0.1)
    assert hog.where == "zero if it fell all the way as from 0.15 to 1.04 m"


def test_lengths_as_lines() -> None:
    """From places on whole mm, the zero towards the moment: |1499 - 200| = 1299 mm of 1299.6.

    At a girder M = w l^2/24: 2 x 7600/24 - 400/2 = 433.33 mm. No zero: 7.2/4 = 1.8 m.
    """
    sheet = new_sheet(CHECKED)
    with sheet.part("between", "Between places"):
        record_length(place(sheet), Beside(200.0, 1499.6, "1.25D + 1.5L"))
    with sheet.part("restrained", "Restrained"):
        record_restrained_length(place(sheet, l="7.6 m", b_sp="400 mm"), 24.0)
    with sheet.part("nowhere", "No zero"):
        record_length(place(sheet, l_n="7.2 m"), Beside(200.0, None, "1.4D"))
    assert sheet.entry("between/l_vf").value == pytest.approx(1299)
    assert "1.25D + 1.5L" in sheet.entry("between/x_vz").source.origin
    assert sheet.entry("restrained/l_vf").value == pytest.approx(433.33, abs=0.01)
    assert sheet.entry("nowhere/l_vf").value == pytest.approx(1800)
    assert not list(faults(sheet.close().data))


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("10M", "is not understood; write '10M at 250 mm'"),
        ("12M at 250 mm", "12M"),
        ("10M at 2 m", "a spacing outside 50 to 500 mm"),
        ("10M at 2 mm", "a spacing outside 50 to 500 mm"),  # bars that lie in each other
        ("10M at 250", "has no unit"),
        ("5 x 10M at 250 mm", "is not understood"),
    ],
)
def test_slab_bars_that_cannot_be_read(text: str, said: str) -> None:
    with pytest.raises(UserError) as caught:
        read_slab_bars("slab_bars", text)
    assert said in str(caught.value)


def test_slab_bars_as_typed() -> None:
    assert read_slab_bars("slab_bars", "15m at 0.2 m") == SlabBars(1, "15M", 200.0)
    assert str(SlabBars(1, "15M", 200.0)) == "15M at 200 mm"
