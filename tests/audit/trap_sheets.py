"""Calcs of one's own making that fall into a trap no flow of the house can reach."""

from __future__ import annotations

from collections.abc import Mapping

from lineproof.record import Record
from lineproof.sheet import Sheet

from .trap_cases import Case

GIVEN: Mapping[str, tuple[str, str]] = {
    "f_c": ("32 MPa", "strength of the concrete"),
    "f_y": ("400 MPa", "strength of the bars"),
    "phi_c": ("0.65", "factor of the concrete"),
    "phi_s": ("0.85", "factor of the bars"),
    "alpha_1": ("0.802", "stress of the block"),
    "beta_1": ("0.89", "depth of the block"),
    "E_s": ("200000 MPa", "modulus of the bars"),
    "eps_cu": ("0.0035", "strain of the concrete"),
    "b_w": ("380 mm", "width of the web"),
    "b_f": ("1200 mm", "width of the flange"),
    "h_f": ("120 mm", "thickness of the slab"),
    "M_f": ("300 kN.m", "factored moment"),
}


def _sheet(**more: tuple[str, str]) -> Sheet:
    sheet = Sheet("B1")
    with sheet.part("data", "Data"):
        for symbol, (typed, title) in {**GIVEN, **more}.items():
            sheet.given(symbol, typed, title)
    return sheet


def nominal() -> Record:
    """Return a calc that compares a nominal resistance with the factored moment."""
    sheet = _sheet(M_n=("340 kN.m", "nominal resistance"))
    with sheet.part("flexure", "Flexure"):
        sheet.check("M_f <= M_n", title="Moment resistance", key="strength")
    return sheet.close()


def balanced_as_a_rectangle() -> Record:
    """The balanced block of 250 mm reaches below the flange of 120 mm."""
    sheet = _sheet(a_b=("250 mm", "depth of the balanced block"))
    with sheet.part("balanced", "Balanced condition"):
        sheet.line(
            "C_b = alpha_1*phi_c*f_c*b*a_b", unit="kN", title="Compression",
            b=sheet.entry("data/b_f"),
        )  # fmt: skip
    return sheet.close()


def _doubly(formula: str) -> Record:
    """With c = 100 mm and d' = 60 mm the strain is 0.0035 x 40/100 = 0.0014: 280 MPa."""
    sheet = _sheet(
        c=("100 mm", "neutral axis"), d_p=("60 mm", "depth to the bars"),
        A_sp=("1000 mm2", "bars in compression"),
    )  # fmt: skip
    with sheet.part("flexure", "Flexure"):
        sheet.line(formula, unit="MPa", title="Stress in the compression bars")
    return sheet.close()


def yield_assumed() -> Record:
    """Return a calc in which the bars in compression are taken at yield."""
    return _doubly("f_sp = f_y")


def force_at_yield() -> Record:
    """Return a calc that takes the force of the bars in compression at yield, with no c at all."""
    sheet = _sheet(A_sp=("1000 mm2", "bars in compression"))
    with sheet.part("flexure", "Flexure"):
        sheet.line("C_s = phi_s*A_sp*f_y", unit="kN", title="Force in the compression bars")
    return sheet.close()


def displaced_concrete() -> Record:
    """Return a calc that takes the displaced concrete off in one line and not in the other."""
    sheet = _sheet(A_sp=("1000 mm2", "bars in compression"), f_sp=("280 MPa", "their stress"))
    with sheet.part("one", "At midspan"):
        sheet.line("C_s = A_sp*(phi_s*f_sp - alpha_1*phi_c*f_c)", unit="kN", title="Force")
    with sheet.part("two", "At the support"):
        sheet.line("C_s = A_sp*phi_s*f_sp", unit="kN", title="Force")
    return sheet.close()


def first_layer() -> Record:
    """Return a calc of two layers whose resistance takes the depth of the lower one."""
    sheet = _sheet()
    with sheet.part("flexure", "Flexure"):
        for symbol, typed in (("A_s", "2500 mm2"), ("A_s2", "1000 mm2"), ("d_1", "560 mm"),
                              ("d_2", "510 mm"), ("d", "540 mm"), ("a", "50 mm")):  # fmt: skip
            sheet.given(symbol, typed, "of two layers")
        sheet.line(
            "M_r = phi_s*A_s*f_y*(d - a/2)", unit="kN.m", title="Moment resistance",
            d=sheet.entry("flexure/d_1"),
        )  # fmt: skip
    return sheet.close()


def no_dead_alone() -> Record:
    """Return a calc of one span that factors its loads and leaves 1.4D out."""
    sheet = _sheet(w_D=("20 kN/m", "dead load"), w_L=("15 kN/m", "live load"))
    with sheet.part("loads", "Loads"):
        sheet.line("w_f2 = 1.25*w_D + 1.5*w_L", unit="kN/m", title="Factored load")
    return sheet.close()


def clear_span() -> Record:
    """Return a calc whose moment is that of the clear span."""
    sheet = _sheet(
        w_f=("47 kN/m", "factored load"), l=("7.6 m", "span"), l_n=("7.2 m", "clear span")
    )
    with sheet.part("moment", "Moment"):
        sheet.line("M_f = w_f*l**2/8", unit="kN.m", title="Moment", l=sheet.entry("data/l_n"))
    return sheet.close()


def area_too_small() -> Record:
    """Return a calc that reduces the live load of 60 m2 of assembly, by the rule of offices."""
    sheet = _sheet(
        A_L=("60 m2", "area"), A_Lmin=("80 m2", "least area"), A_0=("9.8 m2", "reference area")
    )
    with sheet.part("loads", "Loads"):
        sheet.line("r_L = 0.3 + sqrt(A_0/A_L)", unit="", title="Reduction")
    return sheet.close()


def reduced(use: str) -> Record:
    """Return a calc that reduces the live load of 100 m2 of a use, by the rule of offices."""
    sheet = _sheet(
        A_L=("100 m2", "area"), A_0=("9.8 m2", "reference area"), l=("8 m", "span"),
        b_tr=("12.5 m", "tributary width"),
    )  # fmt: skip
    with sheet.part("loads", "Loads"):
        sheet.note("choices", f"Section T; use: {use}; exposure class N.", title="Choices")
        sheet.line("r_L = 0.3 + sqrt(A_0/A_L)", unit="", title="Reduction")
    return sheet.close()


def larger_area() -> Record:
    """Return a calc that reduces by 100 m2 where the beam carries 8 x 5 = 40 m2."""
    sheet = _sheet(
        A_L=("100 m2", "area"), A_0=("9.8 m2", "reference area"), l=("8 m", "span"),
        b_tr=("5 m", "tributary width"),
    )  # fmt: skip
    with sheet.part("loads", "Loads"):
        sheet.line("r_L = 0.3 + sqrt(A_0/A_L)", unit="", title="Reduction")
    return sheet.close()


def bars_of_the_support() -> Record:
    """Return a calc whose ratio of compression bars at midspan takes those over the support."""
    sheet = _sheet(d=("540 mm", "depth"))
    with sheet.part("top", "Top bars over the support"):
        sheet.given("A_sp", "900 mm2", "bars in compression")
    with sheet.part("deflection", "Deflection at midspan"):
        sheet.line(
            "rho_p = A_sp/(b_f*d)", unit="", title="Ratio", A_sp=sheet.entry("top/A_sp")
        )  # fmt: skip
    return sheet.close()


def bars_of_both_faces() -> Record:
    """Return a calc whose strain counts the bars of both faces."""
    sheet = _sheet(
        V_f=("200 kN", "factored shear"), d_v=("500 mm", "depth for shear"),
        A_sb=("1500 mm2", "bottom bars"), A_sp=("900 mm2", "top bars"),
    )  # fmt: skip
    with sheet.part("shear", "Shear"):
        sheet.line("A_s = A_sb + A_sp", unit="mm2", title="Bars")
        sheet.line("eps_x = (M_f/d_v + V_f)/(2*E_s*A_s)", unit="", title="Strain at mid-depth")
    return sheet.close()


def redistributed(formula: str, **more: tuple[str, str]) -> Record:
    """Return a calc that redistributes a moment which is no moment of one load case."""
    sheet = _sheet(p_rd=("10", "change, per cent"), **more)
    with sheet.part("moments", "Moments"):
        sheet.line(formula, unit="kN.m", title="Moment to be changed")
        sheet.line("M_f = M_fe*(1 - p_rd/100)", unit="kN.m", title="After redistribution")
    return sheet.close()


def envelope() -> Record:
    """Return a calc that redistributes an envelope."""
    return redistributed(
        "M_fe = max(M_a1, M_a2)", M_a1=("300 kN.m", "case 1"), M_a2=("320 kN.m", "case 2")
    )


def coefficients() -> Record:
    """Return a calc that redistributes moments by coefficients."""
    return redistributed(
        "M_fe = w_f*l_n**2/k_M", w_f=("47 kN/m", "load"), l_n=("7.2 m", "clear span"),
        k_M=("11", "divisor"),
    )  # fmt: skip


def typed_area() -> Record:
    """Return a calc with 5 bars of 300 mm2 and an area of four."""
    sheet = _sheet()
    with sheet.part("bars", "Bars"):
        sheet.given("n_b", "5", "number of bars")
        sheet.given("A_b", "300 mm2", "area of a bar")
        sheet.given("A_s", "1200 mm2", "area of the bars")
    return sheet.close()


def right() -> Record:
    """Return a calc that reduces and counts as it should: 100 m2 of offices."""
    return reduced("office")


SHEETS = (
    Case(12, "a nominal resistance is compared with a factored force", nominal, "flexure/strength"),
    Case(13, "the balanced block reaches below the flange", balanced_as_a_rectangle,
         "balanced/C_b"),
    Case(14, "the bars in compression do not yield at this depth", yield_assumed, "flexure/f_sp"),
    Case(14, "yield of the bars in compression is assumed", force_at_yield, "flexure/C_s"),
    Case(14, "the concrete that the bars displace is taken off elsewhere", displaced_concrete,
         "two/C_s"),
    Case(24, "the depth of the first layer stands for that of both", first_layer, "flexure/M_r"),
    Case(15, "The load combination 1.4D is not made", no_dead_alone, "loads/w_f2"),
    Case(27, "the clear span stands for the span between supports", clear_span, "moment/M_f"),
    Case(16, "the area is too small for a reduction", area_too_small, "loads/r_L"),
    Case(16, "live load on roofs and slabs is not reduced", lambda: reduced("roof"), "loads/r_L"),
    Case(16, "the reduction of other uses is taken for this use",
         lambda: reduced("assembly area"), "loads/r_L"),
    Case(16, "the area is larger than span times tributary width", larger_area, "loads/r_L"),
    Case(19, "the bars in compression are those of another place", bars_of_the_support,
         "deflection/rho_p"),
    Case(9, "bars on the face in compression are counted", bars_of_both_faces, "shear/eps_x"),
    Case(17, "an envelope is redistributed, not a load case", envelope, "moments/M_f"),
    Case(17, "a moment by coefficients is redistributed", coefficients, "moments/M_f"),
    Case(31, "is not the area of 5 bars of 300 mm²", typed_area, "bars/A_s"),
)  # fmt: skip
